//! All joints in one table, worst first.

use comfy_table::{CellAlignment, ColumnConstraint, ContentArrangement, Table, TableComponent};

use super::page::clean;
use super::{group, number};
use crate::review::JointReview;

/// Rows of a table that is not written out.
pub(super) const ROWS: usize = 30;

/// The table of these joints, in their order; no line is wider than `width` where the marks allow it.
pub(super) fn draw(joints: &[&JointReview], width: usize) -> Vec<String> {
    let mut table = Table::new();
    table.load_preset(comfy_table::presets::NOTHING);
    table.set_style(TableComponent::HeaderLines, '-');
    table.set_style(TableComponent::MiddleHeaderIntersections, ' ');
    table.set_content_arrangement(ContentArrangement::Dynamic);
    table.set_width(u16::try_from(width).unwrap_or(u16::MAX));
    // Nothing is said by a column of dashes.
    let columns = if joints.iter().any(|joint| joint.detail.is_some()) { 9 } else { 8 };
    let header =
        ["joint", "outcome", "util.", "governed by", "M_Ed\nkNm", "M_Rd\nkNm", "V_Ed\nkN", "V_Rd\nkN", "detail"];
    table.set_header(header.iter().take(columns));
    for joint in joints {
        table.add_row(row(joint).iter().take(columns).map(|cell| clean(cell)));
    }
    for (index, column) in table.column_iter_mut().enumerate() {
        column.set_padding((0, 1));
        if !matches!(index, 0 | 3 | 8) {
            column.set_constraint(ColumnConstraint::ContentWidth);
        }
        if matches!(index, 2 | 4..=7) {
            column.set_cell_alignment(CellAlignment::Right);
        }
    }
    table.lines().map(|line| line.trim_end().to_owned()).collect()
}

fn row(joint: &JointReview) -> [String; 9] {
    let worst = group::worst_case(joint);
    let moment = worst.and_then(|case| case.moment_knm);
    let against = worst.and_then(|case| case.moment_resistance_knm).or(match moment {
        Some(m) if m < 0.0 => joint.resistance.moment_reversed_knm,
        _ => joint.resistance.moment_knm,
    });
    let governed = match group::governing(joint) {
        _ if !joint.found() => group::without_steel(joint),
        Some(governed) => governed,
        None if group::assessed(joint) => "",
        None => "not assessed",
    };
    let plain = |value: Option<f64>| value.filter(|v| v.is_finite()).map_or("-".into(), number::one_decimal);
    [
        joint.mark.clone(),
        joint.outcome.word().to_owned(),
        joint.utilisation().map_or("-".into(), number::utilisation),
        governed.to_owned(),
        plain(moment),
        plain(against),
        plain(worst.and_then(|case| case.shear_kn)),
        plain(joint.resistance.shear_kn),
        joint.detail.clone().unwrap_or_else(|| "-".into()),
    ]
}
