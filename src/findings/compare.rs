//! Whether two sizes, grades, bolt classes or sections are the same, and which is the stronger.

use std::cmp::Ordering;

use crate::rulebook::{Grade, Rulebook, Section};
use crate::units::Length;

/// Whether two lengths differ by more than the tolerance, or by nobody knows what.
pub(super) fn differs(a: Length, b: Length, tolerance: Length) -> bool {
    a.get().is_nan() || b.get().is_nan() || (a - b).abs() > tolerance
}

/// Whether `a` falls short of `b` by more than the tolerance, or nobody knows.
pub(super) fn less(a: Length, b: Length, tolerance: Length) -> bool {
    a.get().is_nan() || b.get().is_nan() || a < b - tolerance
}

/// Whether `a` passes `b` by more than the tolerance.
pub(super) fn more(a: Length, b: Length, tolerance: Length) -> bool {
    a > b + tolerance
}

/// How what was detailed stands to what was intended.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Strength {
    /// The same or as strong.
    Same,
    /// Weaker in something.
    Lower,
    /// Stronger in something, weaker in nothing.
    Higher,
    /// Another one, and no table says which is the stronger.
    Unranked,
}

impl Strength {
    /// From the order of each property; weaker in one is weaker.
    fn of(orders: &[Option<Ordering>]) -> Self {
        if orders.iter().any(Option::is_none) {
            Self::Unranked
        } else if orders.contains(&Some(Ordering::Less)) {
            Self::Lower
        } else if orders.contains(&Some(Ordering::Greater)) {
            Self::Higher
        } else {
            Self::Same
        }
    }

    /// The word for a message.
    pub(super) fn word(self) -> &'static str {
        match self {
            Self::Same => "as intended",
            Self::Lower => "lower than intended",
            Self::Higher => "higher than intended",
            Self::Unranked => "another than intended, and no table ranks the two",
        }
    }
}

/// Grades by f_y and f_u at the part's thickness.
pub(super) fn grades(rulebook: &Rulebook, detailed: &Grade, intended: &str, thickness: Option<Length>) -> Strength {
    let named = rulebook.grade(intended);
    if named.as_ref() == Some(detailed) || plain(&detailed.0) == plain(intended) {
        return Strength::Same;
    }
    let (Some(named), Some(thickness)) = (named, thickness) else { return Strength::Unranked };
    match (rulebook.strength(detailed, thickness), rulebook.strength(&named, thickness)) {
        (Ok(detailed), Ok(intended)) => Strength::of(&[
            detailed.value.f_y.partial_cmp(&intended.value.f_y),
            detailed.value.f_u.partial_cmp(&intended.value.f_u),
        ]),
        _ => Strength::Unranked,
    }
}

/// Bolt classes by f_ub.
pub(super) fn classes(rulebook: &Rulebook, detailed: &str, intended: &str) -> Strength {
    let named = |text: &str| {
        rulebook.bolt_class(text.trim()).or_else(|| rulebook.bolt_class(&rulebook.class_in(text)?)).map(|c| c.f_ub)
    };
    match (named(detailed), named(intended)) {
        (Some(detailed), Some(intended)) => Strength::of(&[detailed.partial_cmp(&intended)]),
        _ if plain(detailed) == plain(intended) => Strength::Same,
        _ => Strength::Unranked,
    }
}

/// Sections: by catalogue name, by sizes where the names differ, by the text where no catalogue knows the intended one.
///
/// A part that has the name and not the sizes is the business of `witnesses-disagree`.
pub(super) fn sections(rulebook: &Rulebook, detailed: &Section, intended: &str) -> Strength {
    let Some(named) = rulebook.section(intended) else {
        return if plain(&detailed.designation) == plain(intended) { Strength::Same } else { Strength::Unranked };
    };
    if rulebook.section(&detailed.designation).is_some_and(|own| own.designation == named.designation) {
        return Strength::Same;
    }
    let tolerance = rulebook.tolerances.size;
    let order = |a: Length, b: Length| if differs(a, b, tolerance) { a.partial_cmp(&b) } else { Some(Ordering::Equal) };
    let orders = [
        order(detailed.h, named.h),
        order(detailed.b, named.b),
        order(detailed.t_f, named.t_f),
        order(detailed.t_w, named.t_w),
    ];
    match Strength::of(&orders) {
        Strength::Lower if orders.contains(&Some(Ordering::Greater)) => Strength::Unranked,
        strength => strength,
    }
}

/// A name without what people write differently: case, blanks, the sign between sizes.
fn plain(text: &str) -> String {
    let text = text.trim().to_uppercase().replace(['×', '*'], "X").replace(',', ".");
    text.chars().filter(|c| c.is_alphanumeric() || *c == '.').collect()
}
