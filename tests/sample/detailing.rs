//! The sample's detailing by itself: every joint could be built. What deviates deviates on purpose, never by a slip.

use super::boathouse::{boathouse, intended};
use crate::writer::building::{Detail, Level, Section};
use crate::writer::hardware;

/// Mark, what was detailed, beam's and column's section.
fn joints() -> Vec<(String, Detail, Section, Section)> {
    let building = boathouse();
    let column = |index: usize| building.columns[index].section.clone();
    let of = |beam: &crate::writer::building::Beam| -> Vec<_> {
        beam.joints().map(|(at, j)| (j.mark.clone(), j.detail.clone(), beam.section.clone(), column(at))).collect()
    };
    building.beams.iter().flat_map(of).collect()
}

#[test]
fn edge_distances_and_spacings_obey_table_3_3() {
    // EN 1993-1-8 Table 3.3, minima: e1, e2 1.2 d0; p1 2.2 d0; p2 2.4 d0.
    for (mark, detail, _, column) in joints() {
        let (plate, bolts) = (&detail.plate, &detail.bolts);
        let hole = hardware::size(bolts.diameter).hole;
        let (first, last) = (bolts.rows[0], bolts.rows[bolts.rows.len() - 1]);
        assert!(plate.top - first >= 1.2 * hole, "{mark}: upper edge");
        assert!(last - plate.bottom >= 1.2 * hole, "{mark}: lower edge");
        assert!((plate.width - bolts.gauge) / 2.0 >= 1.2 * hole, "{mark}: side edge of the plate");
        assert!((column.b - bolts.gauge) / 2.0 >= 1.2 * hole, "{mark}: side edge of the flange");
        assert!(bolts.gauge >= 2.4 * hole, "{mark}: gauge");
        assert!(bolts.rows.windows(2).all(|pair| pair[0] - pair[1] >= 2.2 * hole), "{mark}: pitch");
    }
}

#[test]
fn washers_clear_root_radii_and_welds() {
    for (mark, detail, beam, column) in joints() {
        let radius = hardware::size(detail.bolts.diameter).washer.1 / 2.0;
        let side = detail.bolts.gauge / 2.0;
        assert!(side - radius >= column.t_w / 2.0 + column.r, "{mark}: root of the column");
        // The leg of a fillet: a √2. Where no weld is modelled the intended ones stand in.
        let (flange, web) = detail.welds.as_ref().map_or((7.0, 5.0), |welds| (welds.flange, welds.web));
        assert!(side - radius >= beam.t_w / 2.0 + web * 2f64.sqrt(), "{mark}: weld of the web");
        for row in &detail.bolts.rows {
            for (lower, upper) in [(0.0, beam.t_f), (beam.h - beam.t_f, beam.h)] {
                let leg = flange * 2f64.sqrt();
                assert!(*row + radius <= lower - leg || *row - radius >= upper + leg, "{mark}: weld near row {row}");
            }
        }
    }
}

#[test]
fn stiffeners_clear_the_nuts() {
    for (mark, detail, beam, _) in joints() {
        let radius = hardware::size(detail.bolts.diameter).washer.1 / 2.0;
        for stiffener in &detail.stiffeners {
            let height = match stiffener.at {
                Level::Top => beam.h - beam.t_f / 2.0,
                Level::Bottom => beam.t_f / 2.0,
            };
            let clear = radius + stiffener.thickness / 2.0 + stiffener.throat * 2f64.sqrt();
            assert!(detail.bolts.rows.iter().all(|row| (row - height).abs() >= clear), "{mark}: {:?}", stiffener.at);
        }
    }
}

#[test]
fn bolts_are_of_a_length_that_can_be_tightened() {
    // J44 has bolts that are too short.
    for (mark, detail, _, column) in joints().into_iter().filter(|(mark, ..)| mark != "J44") {
        let size = hardware::size(detail.bolts.diameter);
        let grip = detail.plate.thickness + column.t_f;
        let length = hardware::length(size, grip);
        // A thread or more stands out of the nut, and not a handful; the nut finds thread under its face.
        let out = length - grip - size.washer.0 - size.nut;
        assert!((size.pitch..size.pitch + 10.0).contains(&out), "{mark}: {out} mm out of the nut");
        assert!(length - size.thread <= grip + size.washer.0 - size.pitch, "{mark}: no thread under the nut");
    }
}

#[test]
fn the_plate_covers_the_beam() {
    for (mark, detail, beam, column) in joints() {
        assert!(detail.plate.bottom <= 0.0 && detail.plate.top >= beam.h, "{mark}: height");
        assert!(detail.plate.width >= beam.b && detail.plate.width <= column.b, "{mark}: width");
    }
}

#[test]
fn only_the_listed_joints_deviate() {
    // The list of README.md, by mark.
    let deviating = ["J02", "J04", "J06", "J08", "J10", "J11", "J12", "J14", "J16", "J18", "J20"];
    let sizes = |detail: &Detail| {
        let class = detail.bolts.class.clone().map(|(class, _)| class);
        let welds = detail.welds.as_ref().map(|welds| [welds.flange, welds.web]);
        let stiffeners: Vec<_> = detail.stiffeners.iter().map(|s| (s.at, s.thickness as u32)).collect();
        format!("{:?} {:?} {class:?} {welds:?} {stiffeners:?}", detail.plate, detail.bolts.rows)
    };
    let sizes_of = |names: &[&str]| -> Vec<String> { names.iter().map(|name| sizes(&intended(name))).collect() };
    let (here, behind) = (sizes_of(&["M1", "M2", "M3", "M4"]), sizes_of(&["M1", "M3", "M7", "M8", "M9", "M10", "M11"]));
    for (mark, detail, ..) in joints() {
        // In the slip house no end plate deviates, only bolts' lengths and what strengthens the columns.
        let types = if mark.as_str() > "J30" && mark.starts_with('J') { &behind } else { &here };
        assert_eq!(!types.contains(&sizes(&detail)), deviating.contains(&mark.as_str()), "{mark}");
    }
}
