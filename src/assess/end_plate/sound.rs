//! Whether a layout's sizes are such that the formulas have a meaning.

use super::numbers::BoltNumbers;
use crate::joints::{BoltRow, BoltedPlate, PlateSide, Support};
use crate::rulebook::Rulebook;
use crate::units::Length;

/// What of the layout no formula may be asked about: the thing and why. `other_h`: the depth of a splice's other beam.
/// Written so that NaN is refused.
pub fn reasons(
    joint: BoltedPlate<'_>,
    beam_h: Length,
    other_h: Option<Length>,
    bolts: &BoltNumbers,
    rulebook: &Rulebook,
) -> Vec<(&'static str, String)> {
    let mut reasons = Vec::new();
    plate_size(joint.side, beam_h, rulebook, &mut reasons);
    if let (Support::Plate(other), Some(h)) = (joint.support, other_h) {
        plate_size(other, h, rulebook, &mut reasons);
    }
    reasons.extend(of_bolts(&joint.bolts.rows, bolts, rulebook));
    let ends = match joint.support {
        Support::Column(layout) => [layout.column_above, layout.column_below],
        Support::Plate(_) => [None, None],
    };
    if !ends.into_iter().flatten().all(|end| end.get().is_finite()) {
        reasons.push(("column end", "its distance from the rows is no number".into()));
    }
    reasons
}

/// The same of rows of two bolts and their holes.
pub(in crate::assess) fn of_bolts(
    rows: &[BoltRow],
    bolts: &BoltNumbers,
    rulebook: &Rulebook,
) -> Vec<(&'static str, String)> {
    let mut reasons = Vec::new();
    let (d, d_0) = (bolts.d, bolts.d_0);
    for (i, row) in rows.iter().enumerate() {
        if !(row.height.get().is_finite() && [row.gauge, row.edge_plate, row.edge_column].into_iter().all(positive)) {
            reasons.push((
                "bolt row",
                format!(
                    "row {}: height {}, gauge {}, edge distances {} and {}",
                    i + 1,
                    row.height,
                    row.gauge,
                    row.edge_plate,
                    row.edge_column
                ),
            ));
        }
    }
    for (i, pair) in rows.windows(2).enumerate() {
        if let [upper, lower] = pair
            && !(upper.height - lower.height >= d)
        {
            let pitch = upper.height - lower.height;
            reasons.push(("bolt pitch", format!("rows {} and {} lie {pitch} apart, bolts of {d}", i + 1, i + 2)));
        }
    }
    let size = rulebook.tolerances.size;
    match rulebook.clearance(d) {
        Some(normal) if d_0 >= d && d_0 <= d + normal.round + size => {}
        Some(normal) => reasons.push((
            "bolt hole",
            format!(
                "{d_0} for a bolt of {d}: Table 3.4 is for normal round holes, {} here (3.6.1(4)); larger ones are not assessed yet",
                d + normal.round
            ),
        )),
        None => reasons.push(("bolt hole", format!("no table has the clearance of a bolt of {d}"))),
    }
    reasons
}

pub(in crate::assess) fn positive(value: Length) -> bool {
    value.get().is_finite() && value > Length::ZERO
}

fn plate_size(side: PlateSide<'_>, beam_h: Length, rulebook: &Rulebook, reasons: &mut Vec<(&'static str, String)>) {
    let (plate, soffit) = (side.plate, side.soffit);
    if !(positive(plate.thickness) && positive(plate.width)) {
        reasons.push(("end plate size", format!("thickness {}, width {}", plate.thickness, plate.width)));
    }
    let position = rulebook.tolerances.position;
    let (bottom, top) = (plate.bottom - soffit, plate.top - soffit);
    let finite = bottom.get().is_finite() && top.get().is_finite();
    let depth = side.haunch.map_or(Length::ZERO, |haunch| haunch.depth);
    if !(finite && bottom <= position - depth && top >= beam_h - position) {
        reasons.push((
            "end plate shorter than the beam",
            format!("it reaches from {bottom} to {top} above the soffit, the beam from {} to {beam_h}", -depth),
        ));
    }
}
