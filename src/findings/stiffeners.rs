//! Which column stiffener stands level with which flange of the beam.

use super::context::Context;
use crate::intent::IntendedStiffener;
use crate::joints::Stiffener;

/// What is intended and what stands level with one flange of the beam.
pub(super) struct AtFlange<'a> {
    /// "top" or "bottom".
    pub flange: &'static str,
    /// `None` inside: none intended.
    pub intended: &'a Option<IntendedStiffener>,
    /// What stands there.
    pub detailed: Option<&'a Stiffener>,
}

/// Both flanges, as far as something is stated about them and their level is known.
///
/// A stiffener is level with a flange where the two overlap in height within the position tolerance; of several the
/// nearest counts.
pub(super) fn at_flanges<'a>(context: &Context<'a>) -> Vec<AtFlange<'a>> {
    let Some((layout, intended)) = context.both() else { return Vec::new() };
    let Some(layout) = layout.on_column() else { return Vec::new() };
    let stated = [("top", &intended.stiffener_top), ("bottom", &intended.stiffener_bottom)];
    let stated = stated.into_iter().filter_map(|(flange, stated)| Some((flange, stated.as_ref()?)));
    let level = |flange: &'static str, intended| {
        if layout.stiffeners.is_empty() {
            return Some(AtFlange { flange, intended, detailed: None });
        }
        let section = &layout.beam.section.as_ref().ok()?.value;
        let middle = if flange == "top" { section.h - section.t_f / 2.0 } else { section.t_f / 2.0 };
        let off = |stiffener: &Stiffener| (stiffener.height - middle).abs();
        let tolerance = context.rulebook.tolerances.position;
        let reach = |stiffener: &Stiffener| (stiffener.thickness + section.t_f) / 2.0 + tolerance;
        let level = layout.stiffeners.iter().filter(|stiffener| off(stiffener) <= reach(stiffener));
        let detailed = level.min_by(|a, b| off(a).get().total_cmp(&off(b).get()));
        Some(AtFlange { flange, intended, detailed })
    };
    stated.filter_map(|(flange, intended)| level(flange, intended)).collect()
}
