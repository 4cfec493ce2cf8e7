//! The slip house behind the boat hall: joints that are spliced, haunched or strengthened.

use glam::{DVec3, dvec3};

use super::boathouse::{intended, section};
use crate::writer::building::{Along, Beam, Building, Column, Detail, End, Joint};
use crate::writer::fastening::end_plate_bolts;
use crate::writer::fittings::{self, Haunch, Plain, Standing};
use crate::writer::space::{Face, face};

/// Levels of floor and roof.
const FLOOR: f64 = 3600.0;
const ROOF: f64 = 6800.0;
/// Its frames stand on line 3.
const LINE: f64 = 14000.0;

/// Mark of a joint, its detail as made, and the column's mark.
type Place = (&'static str, &'static str, &'static str);

/// The splices, each with the beam that comes second by mark and the other.
pub const SPLICES: [(&str, [&str; 2]); 2] = [("J32", ["B12", "B11"]), ("J35", ["B14", "B13"])];

/// What the shop made of a joint.
fn detailed(mark: &str, detail: &str) -> Detail {
    let mut made = intended(detail);
    if mark == "J44" {
        made.bolts.length = Some(60.0);
    }
    made
}

/// Puts the slip house into the building.
pub fn add(building: &mut Building) {
    for (mark, x) in [("S1", 0.0), ("S2", 10000.0), ("S3", 14000.0), ("S4", 21000.0), ("S5", 25000.0), ("S6", 32000.0)]
    {
        building.columns.push(Column {
            mark: mark.into(),
            section: section("UKC 254x254x89"),
            grade: "S355JR".into(),
            at: [x, LINE],
            bottom: 0.0,
            top: 7100.0,
            depth: Along::X,
        });
    }
    spliced(
        building,
        ("B11", "B12"),
        "UKB 406x178x60",
        ROOF,
        ("J31", "M7", "S1"),
        ("J33", "M7", "S2"),
        ("J32", "M5", [25.0, 25.0]),
    );
    spliced(
        building,
        ("B13", "B14"),
        "UKB 457x191x74",
        FLOOR,
        ("J34", "M8", "S1"),
        ("J36", "M8", "S2"),
        ("J35", "M6", [20.0, 12.0]),
    );
    let whole = [
        ("B15", "UKB 457x191x74", ROOF, ("J37", "M9", "S3"), ("J38", "M9", "S4")),
        ("B16", "UKB 457x191x74", FLOOR, ("J39", "M10", "S3"), ("J40", "M11", "S4")),
        ("B17", "UKB 406x178x60", ROOF, ("J41", "M3", "S5"), ("J42", "M12", "S6")),
        ("B18", "UKB 457x191x74", FLOOR, ("J43", "M1", "S5"), ("J44", "M1", "S6")),
    ];
    for (mark, of, top, start, end) in whole {
        let ends = [joint(building, start), joint(building, end)];
        building.beams.push(beam(mark, of, top, ends));
    }
    for (index, beam) in building.beams.clone().iter().enumerate() {
        for (end, at) in beam.ends.iter().enumerate() {
            if let (End::Joint { column, joint }, Some(face)) = (at, face(&building.columns, beam, end)) {
                fit(building, (index, *column), joint, face);
            }
        }
    }
}

fn beam(mark: &str, of: &str, top: f64, ends: [End; 2]) -> Beam {
    Beam { mark: mark.into(), section: section(of), grade: "S355JR".into(), top, ends }
}

fn joint(building: &Building, (mark, detail, column): Place) -> End {
    let column = building.columns.iter().position(|own| own.mark == column).expect("a column of the slip house");
    End::Joint { column, joint: Box::new(Joint { mark: mark.into(), told: false, detail: detailed(mark, detail) }) }
}

/// Two beams in line between two columns, spliced in the middle by end plates of two thicknesses.
fn spliced(
    building: &mut Building,
    (west, east): (&str, &str),
    of: &str,
    top: f64,
    start: Place,
    end: Place,
    (mark, detail, plates): (&str, &str, [f64; 2]),
) {
    let at = |place: Place| building.columns.iter().find(|own| own.mark == place.2).expect("a column").at[0];
    let middle = (at(start) + at(end)) / 2.0;
    let first = building.beams.len();
    let ends = [joint(building, start), End::Free([middle - plates[0], LINE])];
    let other = [End::Free([middle + plates[1], LINE]), joint(building, end)];
    building.beams.extend([beam(west, of, top, ends), beam(east, of, top, other)]);
    let soffit = dvec3(middle, LINE, top - section(of).h);
    let detail = intended(detail);
    for (side, thickness) in plates.into_iter().enumerate() {
        let face = Face { soffit, out: if side == 0 { -DVec3::X } else { DVec3::X } };
        let mut own = detail.clone();
        own.plate.thickness = thickness;
        let plate = format!("{}-S", [west, east][side]);
        building.fittings.push(fittings::end_plate(first + side, &plate, &section(of), face, &own));
    }
    let face = Face { soffit, out: DVec3::X };
    let path = format!("splice {mark}");
    building.boltings.push(end_plate_bolts(&path, top, face, plates[1], plates[0], &detail.bolts));
}

/// The plates of a joint besides its end plate.
fn fit(building: &mut Building, (beam, column): (usize, usize), joint: &Joint, face: Face) {
    let plain = |thickness, grade: &str, throat| Plain { thickness, grade: grade.into(), throat };
    let mark = joint.mark.as_str();
    let (own, on) = (building.beams[beam].clone(), building.columns[column].clone());
    let on = (column, &on);
    let soffit = face.soffit.z;
    let t_p = joint.detail.plate.thickness;
    let mut add = Vec::new();
    match mark {
        "J31" | "J33" => {
            // The second one is of a lower grade than the beam.
            let grade = if mark == "J33" { "S275JR" } else { "S355JR" };
            let of = Haunch {
                depth: 250.0,
                length: 600.0,
                flange: [15.0, 180.0],
                web: 10.0,
                grade: grade.into(),
                throat: 7.0,
            };
            add.extend(fittings::haunch(beam, &format!("H-{mark}"), face, t_p, &of));
            let end = &plain(12.0, "S355JR", 6.0);
            add.extend(fittings::beam_stiffeners(beam, &format!("HS-{mark}"), &own.section, face, t_p + 600.0, end));
            for (side, hand) in [(1.0, 'L'), (-1.0, 'R')] {
                let level = soffit - 250.0 + 8.0;
                let at = Standing { near: level, far: level, reach: None, side };
                add.push(fittings::column_plate(
                    on,
                    &format!("CS-{mark}{hand}"),
                    face.out,
                    at,
                    &plain(15.0, "S355JR", 6.0),
                ));
            }
        }
        "J34" | "J36" => {
            let of = plain(12.0, "S355JR", if mark == "J36" { 2.0 } else { 8.0 });
            for (side, hand) in [(1.0, 'L'), (-1.0, 'R')] {
                add.push(fittings::web_plate(
                    on,
                    &format!("WP-{mark}{hand}"),
                    side,
                    [soffit - 200.0, soffit + 700.0],
                    205.0,
                    &of,
                ));
            }
        }
        "J42" => {
            let of = plain(12.0, "S355JR", 8.0);
            add.push(fittings::web_plate(on, "WP-J42", 1.0, [soffit + 40.0, soffit + 300.0], 205.0, &of));
        }
        "J37" | "J38" => {
            let sides: &[(f64, char)] = if mark == "J38" { &[(1.0, 'L')] } else { &[(1.0, 'L'), (-1.0, 'R')] };
            for (side, hand) in sides {
                let at = Standing { near: soffit + 8.0, far: soffit + 449.0, reach: None, side: *side };
                add.push(fittings::column_plate(
                    on,
                    &format!("DG-{mark}{hand}"),
                    face.out,
                    at,
                    &plain(12.0, "S355JR", 6.0),
                ));
            }
        }
        "J39" => {
            for (side, hand) in [(1.0, 'L'), (-1.0, 'R')] {
                let level = soffit + 449.0;
                let at = Standing { near: level, far: level, reach: Some(150.0), side };
                add.push(fittings::column_plate(
                    on,
                    &format!("PS-{mark}{hand}"),
                    face.out,
                    at,
                    &plain(12.0, "S275JR", 6.0),
                ));
            }
        }
        _ => {}
    }
    building.fittings.extend(add);
}
