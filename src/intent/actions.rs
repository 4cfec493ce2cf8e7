//! Actions and their units as they stand in a heading or key: `M_Ed_kNm`, `V_Ed [kN]`, `N Ed (MN)`.

use super::LoadCase;
use super::source::given;
use crate::units::{Force, Moment};

/// An action of a load case.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Action {
    Moment,
    Shear,
    Axial,
    Tying,
    ColumnAxial,
    ColumnMoment,
}

/// Units of a moment with their size in N·mm.
const MOMENTS: &[(&str, f64)] = &[("Nmm", 1.0), ("Nm", 1e3), ("kNmm", 1e3), ("kNcm", 1e4), ("kNm", 1e6), ("MNm", 1e9)];

/// Units of a force with their size in N.
const FORCES: &[(&str, f64)] = &[("N", 1.0), ("kN", 1e3), ("MN", 1e6)];

/// What may stand between the letters of a symbol or round a unit.
pub(super) const BETWEEN: &[char] = &[' ', '_', ',', '.', '-', ':', '(', ')', '[', ']', '{', '}'];

/// What may stand between the factors of a unit. No slash: `kN/m` is no moment.
const TIMES: &[char] = &['·', '⋅', '×', '*', '.', '-', '_', ' '];

impl Action {
    /// Its symbol.
    pub fn symbol(self) -> &'static str {
        match self {
            Self::Moment => "M_Ed",
            Self::Shear => "V_Ed",
            Self::Axial => "N_Ed",
            Self::Tying => "F_tie_Ed",
            Self::ColumnAxial => "N_col_Ed",
            Self::ColumnMoment => "M_col_Ed",
        }
    }

    fn units(self) -> &'static [(&'static str, f64)] {
        if matches!(self, Self::Moment | Self::ColumnMoment) { MOMENTS } else { FORCES }
    }

    /// Writes a value (in N·mm or N) into a load case.
    pub fn put(self, value: f64, case: &mut LoadCase) {
        match self {
            Self::Moment => case.moment = Some(Moment(value)),
            Self::Shear => case.shear = Some(Force(value)),
            Self::Axial => case.axial = Some(Force(value)),
            Self::Tying => case.tying = Some(Force(value)),
            Self::ColumnAxial => case.column_axial = Some(Force(value)),
            Self::ColumnMoment => case.column_moment = Some(Moment(value)),
        }
    }
}

/// The action that a heading names and what its unit is in N·mm or N; `None` if it names no action, `Err` if its unit
/// is missing or not known.
pub(super) fn action(heading: &str) -> Option<Result<(Action, f64), String>> {
    let letters = || heading.char_indices().filter(|(_, c)| !BETWEEN.contains(c));
    let begins = |symbol: &str| {
        let mut after = letters();
        symbol.chars().all(|want| after.next().is_some_and(|(_, c)| c.eq_ignore_ascii_case(&want))).then_some(after)
    };
    // The longer symbols first: an "N" also begins "N_col".
    let symbols = [
        ("Mcol", Action::ColumnMoment),
        ("Ncol", Action::ColumnAxial),
        ("Ftie", Action::Tying),
        ("M", Action::Moment),
        ("V", Action::Shear),
        ("N", Action::Axial),
    ];
    let (action, mut letters) = symbols.iter().find_map(|(symbol, action)| Some((*action, begins(symbol)?)))?;
    let (_, e) = letters.next()?;
    let (at, d) = letters.next()?;
    if !e.eq_ignore_ascii_case(&'e') || !d.eq_ignore_ascii_case(&'d') {
        return None;
    }
    // ISO 80000-1 writes quantity and unit with a slash between them: "M_Ed / kNm".
    let written = heading.get(at + 1..)?.trim_matches(BETWEEN).trim_start_matches('/').trim_matches(BETWEEN);
    let unit = written.replace(TIMES, "");
    let known = action.units().iter().find(|(name, _)| {
        // Only the case of "m" tells milli from mega.
        name.eq_ignore_ascii_case(&unit) && !(name.starts_with('M') && unit.starts_with('m'))
    });
    Some(known.map(|(_, size)| (action, *size)).ok_or_else(|| {
        let what = if written.is_empty() { "no unit".into() } else { format!("the unit {}", given(written)) };
        let allowed: Vec<&str> = action.units().iter().map(|(name, _)| *name).collect();
        format!("{} has {what}; allowed are {}", action.symbol(), allowed.join(", "))
    }))
}

/// A decimal number, finite; with `comma` a decimal comma is read too.
pub(super) fn decimal(text: &str, comma: bool) -> Option<f64> {
    let mut text = text.replace('\u{2212}', "-");
    if comma && !text.contains('.') && text.matches(',').count() == 1 {
        text = text.replace(',', ".");
    }
    let plain = text.bytes().all(|b| b.is_ascii_digit() || b"+-.eE".contains(&b));
    text.parse().ok().filter(|value: &f64| plain && value.is_finite())
}
