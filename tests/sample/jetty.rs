//! The jetty: joints that carry shear.

use glam::{DVec3, dvec3};

use super::boathouse::{intended, section};
use crate::writer::building::{Along, Beam, Building, Column, Detail, End, EndPlate, Joint, Notch, Owner, Welds};
use crate::writer::fittings::{self, Covers, Fin, Plain};
use crate::writer::space::Face;

/// Level of its deck, and the lines of its columns and of the beam on the quay walls.
const DECK: f64 = 3000.0;
const LINE: f64 = 21000.0;
const QUAY: f64 = 26000.0;

/// Joints that no end of a beam in the writer's plain description has: supported beam, end, supporting member.
pub const PLACES: [(&str, [&str; 3]); 5] = [
    ("J51", ["B21", "start", "T1"]),
    ("J52", ["B21", "end", "T2"]),
    ("J55", ["B24", "start", "B23"]),
    ("J56", ["B25", "start", "B23"]),
    ("J57", ["T1", "start", ""]),
];

fn plain(thickness: f64, throat: f64) -> Plain {
    Plain { thickness, grade: "S275JR".into(), throat }
}

/// The fin plate as the engineer drew it: three bolts M20 in a plate of 220 by 90 by 10 mm.
fn fin() -> Fin {
    Fin {
        plate: plain(10.0, 5.5),
        edges: [33.4, 253.4],
        width: 90.0,
        diameter: 20.0,
        rows: vec![213.4, 143.4, 73.4],
        out: 50.0,
    }
}

/// Flexible end plates: F2 of partial depth, F3 of full depth; welded to the web only.
pub fn flexible(detail: &str) -> Detail {
    let of = intended("M4");
    let (bottom, top, rows) = match detail {
        "F2" => (43.4, 263.4, vec![223.4, 153.4, 83.4]),
        _ => (-10.0, 313.4, vec![253.4, 183.4, 113.4, 50.0]),
    };
    let plate = EndPlate { thickness: 10.0, width: 170.0, bottom, top, grade: "S275JR".into() };
    let mut bolts = of.bolts;
    bolts.rows = rows;
    Detail { plate, bolts, welds: Some(Welds { flange: 0.0, web: 4.0, bodies: false }), stiffeners: vec![] }
}

/// Puts the jetty into the building.
pub fn add(building: &mut Building) {
    let first = building.columns.len();
    for (mark, x) in [("T1", 0.0), ("T2", 6000.0), ("T3", 12000.0)] {
        building.columns.push(Column {
            mark: mark.into(),
            section: section("UKC 254x254x89"),
            grade: "S355JR".into(),
            at: [x, LINE],
            bottom: 0.0,
            top: 3200.0,
            depth: Along::X,
        });
    }
    let flange = building.columns[first].section.h / 2.0;
    let beam = |mark: &str, of: &str, ends| Beam {
        mark: mark.into(),
        section: section(of),
        grade: "S355JR".into(),
        top: DECK,
        ends,
    };
    let joint = |column, mark: &str, detail| End::Joint {
        column,
        joint: Box::new(Joint { mark: mark.into(), told: false, detail }),
    };
    let free = |x, y| End::Free([x, y]);
    let (light, heavy) = ("UKB 305x165x40", "UKB 457x191x74");
    let beams = building.beams.len();
    // A weld of half the throat, at the full-depth plate.
    let mut slight = flexible("F3");
    slight.welds = Some(Welds { flange: 0.0, web: 2.0, bodies: false });
    building.beams.extend([
        beam("B21", light, [free(flange + 10.0, LINE), free(6000.0 - flange - 10.0, LINE)]),
        beam("B22", light, [joint(first + 1, "J53", flexible("F2")), joint(first + 2, "J54", slight)]),
        // On the quay walls at both ends.
        beam("B23", heavy, [free(0.0, QUAY), free(5995.0, QUAY)]),
        beam("B24", heavy, [free(6005.0, QUAY), free(12000.0, QUAY)]),
        beam("B25", light, [free(3000.0, QUAY + section(heavy).t_w / 2.0 + 10.0), free(3000.0, QUAY + 4000.0)]),
    ]);
    let soffit = |of: &str| DECK - section(of).h;
    let mut fins = Vec::new();
    for (mark, x, out, on) in [("J51", flange, DVec3::X, first), ("J52", 6000.0 - flange, -DVec3::X, first + 1)] {
        let mut own = fin();
        if mark == "J52" {
            own.rows.remove(1); // the middle bolt is not there
        }
        fins.push((mark, Owner::Column(on), Face { soffit: dvec3(x, LINE, soffit(light)), out }, own));
    }
    let web = dvec3(3000.0, QUAY + section(heavy).t_w / 2.0, soffit(light));
    fins.push(("J56", Owner::Beam(beams + 2), Face { soffit: web, out: DVec3::Y }, fin()));
    for (mark, on, face, own) in fins {
        let (plate, bolts) = fittings::fin_plate(on, mark, (&section(light), DECK), face, &own);
        building.fittings.push(plate);
        building.boltings.push(bolts);
    }
    building.notches.push(Notch { beam: beams + 4, end: 0, length: 95.0, depth: 40.0 });
    let covers = Covers {
        sizes: [[15.0, 190.0], [10.0, 350.0]],
        grade: "S355JR".into(),
        diameter: 20.0,
        along: vec![50.0, 120.0, 190.0],
        gauge: 110.0,
        web: (50.0, vec![363.5, 273.5, 183.5, 93.5]),
        end: 40.0,
    };
    let (plates, bolts) = fittings::covers("J55", &section(heavy), dvec3(6000.0, QUAY, soffit(heavy)), &covers);
    building.fittings.extend(plates);
    building.boltings.extend(bolts);
    let column = building.columns[first].clone();
    let (plate, anchors) = fittings::base((first, &column), "J57", &plain(25.0, 6.0), 420.0, (24.0, 320.0, 500.0));
    building.fittings.push(plate);
    building.boltings.push(anchors);
}
