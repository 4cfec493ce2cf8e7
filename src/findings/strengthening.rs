//! What intended strengthening of a column and what stands there have in common: how they are held against each other.

use super::compare::{Strength, grades, less};
use super::context::Context;
use super::say::mm;
use crate::intent::IntendedStiffener;
use crate::joints::{EdgeWeld, Layout, Strengthening};
use crate::origin::Known;
use crate::rulebook::Grade;
use crate::units::Length;

/// Plates as they stand: the thinnest, their grade, the throat of their fillets if they have any.
pub(super) struct Stands<'a> {
    pub thickness: Length,
    pub grade: &'a Known<Grade>,
    pub throat: Option<Length>,
}

/// In what the plates are less than intended, one clause each.
pub(super) fn faults(context: &Context<'_>, intended: &IntendedStiffener, stands: &Stands<'_>) -> Vec<String> {
    let size = context.rulebook.tolerances.size;
    let mut faults = Vec::new();
    if let Some(thickness) = intended.thickness
        && less(stands.thickness, thickness, size)
    {
        faults.push(format!("{} thick instead of {}", mm(stands.thickness), mm(thickness)));
    }
    if let (Some(grade), Ok(own)) = (&intended.grade, stands.grade)
        && let strength @ (Strength::Lower | Strength::Unranked) =
            grades(context.rulebook, &own.value, grade, Some(stands.thickness))
    {
        faults.push(format!("of a grade {}, {} instead of {grade}", strength.word(), own.value.0));
    }
    if let (Some(throat), Some(own)) = (intended.throat, stands.throat)
        && less(own, throat, size)
    {
        faults.push(format!("welded with a throat of {} instead of {}", mm(own), mm(throat)));
    }
    faults
}

/// "12 mm, S275, throat 6 mm", as far as it is known, after `what`.
pub(super) fn printed(what: &str, plates: &IntendedStiffener) -> String {
    let sizes = plates.thickness.map(mm).into_iter().chain(plates.grade.clone());
    let throat = plates.throat.map(|a| format!("throat {}", mm(a)));
    let length = plates.length.map(|l| format!("{} long", mm(l)));
    [what.to_owned()].into_iter().chain(sizes).chain(throat).chain(length).collect::<Vec<String>>().join(", ")
}

/// The same of what stands there; the throat only where one is intended.
pub(super) fn as_they_stand(intended: &IntendedStiffener, stands: &Stands<'_>) -> IntendedStiffener {
    IntendedStiffener {
        thickness: Some(stands.thickness),
        grade: stands.grade.as_ref().ok().map(|grade| grade.value.0.clone()),
        throat: stands.throat.filter(|_| intended.throat.is_some()),
        length: None,
    }
}

/// What strengthens the column, where the joint is on one.
pub(super) fn detailed<'a>(context: &Context<'a>) -> Option<&'a Strengthening> {
    context.layout.and_then(Layout::on_column).map(|layout| &layout.strengthening)
}

/// The throat of fillets; a butt weld has none.
pub(super) fn throat_of(weld: &Known<EdgeWeld>) -> Option<Length> {
    match weld.as_ref().ok()?.value {
        EdgeWeld::Fillet(throat) => Some(throat),
        EdgeWeld::Butt => None,
    }
}

/// The least of some lengths.
pub(super) fn least(lengths: impl Iterator<Item = Length>) -> Option<Length> {
    lengths.reduce(Length::min)
}
