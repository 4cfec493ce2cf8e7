//! A building of any size: equal frames of five bays and four storeys, one behind the other.

use super::building::{
    Along, Beam, BoltBody, Bolts, Building, ClassIn, Column, Detail, End, EndPlate, Joint, Level, PlateAs, Section,
    Stiffener, Storey, Welds,
};

const BAYS: usize = 5;
const STOREYS: usize = 4;
const BAY: f64 = 6500.0;
const HEIGHT: f64 = 3800.0;

/// A building with at least that many joints, at most one more: a beam has two. `told`: with a relation a joint.
///
/// Every joint is extended above the beam and stiffened against its lower flange; inner columns have beams on both sides.
pub fn frames(joints: usize, told: bool) -> Building {
    let beams = joints.div_ceil(2);
    let mut building = Building {
        name: format!("Frames with {joints} joints"),
        site: [0.0; 3],
        storeys: (0..=STOREYS).map(|i| Storey { name: format!("Level {i}"), elevation: i as f64 * HEIGHT }).collect(),
        columns: Vec::new(),
        beams: Vec::with_capacity(beams),
        fittings: Vec::new(),
        boltings: Vec::new(),
        notches: Vec::new(),
        plates: PlateAs::Plate,
    };
    for frame in 0..beams.div_ceil(BAYS * STOREYS) {
        let first = building.columns.len();
        building.columns.extend((0..=BAYS).map(|line| column(frame, line)));
        let places = (1..=STOREYS).flat_map(|storey| (0..BAYS).map(move |bay| (storey, bay)));
        for (storey, bay) in places.take(beams - building.beams.len()) {
            let number = building.beams.len() + 1;
            let end = |column, joint: usize| End::Joint {
                column,
                joint: Box::new(Joint { mark: format!("J{joint:05}"), told, detail: detail() }),
            };
            building.beams.push(Beam {
                mark: format!("B{number}"),
                section: Section { name: "UKB 457x191x74".into(), h: 457.0, b: 190.4, t_w: 9.0, t_f: 14.5, r: 10.2 },
                grade: "S355JR".into(),
                top: storey as f64 * HEIGHT,
                ends: [end(first + bay, 2 * number - 1), end(first + bay + 1, 2 * number)],
            });
        }
    }
    building
}

fn column(frame: usize, line: usize) -> Column {
    Column {
        mark: format!("C{}-{}", frame + 1, line + 1),
        section: Section { name: "UKC 254x254x89".into(), h: 260.3, b: 256.3, t_w: 10.3, t_f: 17.3, r: 12.7 },
        grade: "S355JR".into(),
        at: [line as f64 * BAY, frame as f64 * 6000.0],
        bottom: 0.0,
        top: STOREYS as f64 * HEIGHT + 200.0,
        depth: Along::X,
    }
}

fn detail() -> Detail {
    Detail {
        plate: EndPlate { thickness: 25.0, width: 200.0, bottom: -20.0, top: 552.0, grade: "S275JR".into() },
        bolts: Bolts {
            diameter: 24.0,
            class: Some(("8.8".into(), ClassIn::Name)),
            gauge: 100.0,
            rows: vec![502.0, 392.0, 302.0, 70.0],
            length: None,
            body: BoltBody::Shank,
        },
        welds: Some(Welds { flange: 10.0, web: 6.0, bodies: false }),
        stiffeners: vec![Stiffener { at: Level::Bottom, thickness: 12.0, grade: "S275JR".into(), throat: 6.0 }],
    }
}
