//! The sample: an invented boathouse. What the engineer meant, and what the shop made of it.
//!
//! A boat hall of British sections on grid lines A to D by 1 and 2, and a clubroom wing of European sections on E and F.

use super::{jetty, slip_house};
use crate::writer::building::{
    Along, Beam, BoltBody, Bolts, Building, ClassIn, Column, Detail, End, EndPlate, Joint, Level, PlateAs, Section,
    Stiffener, Storey, Welds,
};

/// A joint's mark, the name of its intended detail, and the column it stands at.
type Place = (&'static str, &'static str, &'static str);

/// The joint that no line of the schedule names; it has no mark of its own, only those of beam and column.
pub const NOT_SCHEDULED: &str = "W5 / K1";

// Sizes: BS 4-1 and EN 10365, from memory; the rule book's section tables hold the same.
pub fn section(name: &str) -> Section {
    let [h, b, t_w, t_f, r] = match name {
        "UKC 254x254x89" => [260.3, 256.3, 10.3, 17.3, 12.7],
        "UKB 457x191x74" => [457.0, 190.4, 9.0, 14.5, 10.2],
        "UKB 406x178x60" => [406.4, 177.9, 7.9, 12.8, 10.2],
        "UKB 406x178x54" => [402.6, 177.7, 7.7, 10.9, 10.2],
        "UKB 305x165x40" => [303.4, 165.0, 6.0, 10.2, 8.9],
        "HE 240 B" => [240.0, 240.0, 10.0, 17.0, 21.0],
        "IPE 360" => [360.0, 170.0, 8.0, 12.7, 18.0],
        "IPE 330" => [330.0, 160.0, 7.5, 11.5, 18.0],
        other => panic!("{other} is no section of the boathouse"),
    };
    Section { name: name.into(), h, b, t_w, t_f, r }
}

/// The details as the engineer drew them, by type.
pub fn intended(detail: &str) -> Detail {
    let plate = |thickness, width, bottom, top| EndPlate { thickness, width, bottom, top, grade: "S275JR".into() };
    let bolts = |diameter, rows: &[f64]| Bolts {
        diameter,
        class: Some(("8.8".into(), ClassIn::Name)),
        gauge: 100.0,
        rows: rows.to_vec(),
        length: None,
        body: BoltBody::Shank,
    };
    let welds = |flange, web| Some(Welds { flange, web, bodies: false });
    let stiffener = |at| Stiffener { at, thickness: 12.0, grade: "S275JR".into(), throat: 6.0 };
    match detail {
        // Extended above the beam, stiffened against the lower flange.
        "M1" => Detail {
            plate: plate(25.0, 200.0, -20.0, 552.0),
            bolts: bolts(24.0, &[502.0, 392.0, 302.0, 70.0]),
            welds: welds(10.0, 6.0),
            stiffeners: vec![stiffener(Level::Bottom)],
        },
        // Flush.
        "M2" => Detail {
            plate: plate(20.0, 180.0, -15.0, 375.0),
            bolts: bolts(20.0, &[295.0, 215.0, 65.0]),
            welds: welds(7.0, 5.0),
            stiffeners: vec![],
        },
        // Extended both ways for moments that reverse.
        "M3" => Detail {
            plate: plate(20.0, 200.0, -95.0, 501.4),
            bolts: bolts(24.0, &[451.4, 341.4, 65.0, -45.0]),
            welds: welds(8.0, 6.0),
            stiffeners: vec![stiffener(Level::Top), stiffener(Level::Bottom)],
        },
        // Extended above the beam, not stiffened.
        "M4" => Detail {
            plate: plate(20.0, 180.0, -15.0, 415.0),
            bolts: bolts(20.0, &[370.0, 265.0, 65.0]),
            welds: welds(7.0, 5.0),
            stiffeners: vec![],
        },
        // Splice of two beams, extended both ways.
        "M5" => Detail {
            plate: plate(25.0, 200.0, -95.0, 501.4),
            bolts: bolts(24.0, &[451.4, 341.4, 65.0, -45.0]),
            welds: welds(8.0, 6.0),
            stiffeners: vec![],
        },
        // Splice of two beams, flush.
        "M6" => Detail {
            plate: plate(20.0, 200.0, -20.0, 477.0),
            bolts: bolts(24.0, &[387.0, 297.0, 70.0]),
            welds: welds(10.0, 6.0),
            stiffeners: vec![],
        },
        // Haunched, extended above the beam.
        "M7" => Detail {
            plate: plate(25.0, 200.0, -270.0, 501.4),
            bolts: bolts(24.0, &[451.4, 341.4, 241.4, -180.0]),
            welds: welds(8.0, 6.0),
            stiffeners: vec![],
        },
        // As M1, the column strengthened by diagonals, which leave no room for nuts near the lower flange.
        "M9" => {
            let mut of = intended("M8");
            of.bolts.rows[3] = 130.0;
            of
        }
        // As M1, the column strengthened by web plates, by a stiffener of partial depth.
        "M8" | "M10" => Detail { stiffeners: vec![], ..intended("M1") },
        // As M1, slip-resistant.
        "M11" => {
            let mut of = intended("M1");
            of.bolts.class = Some(("10.9".into(), ClassIn::Name));
            of
        }
        // As M3 with a web plate.
        "M12" => intended("M3"),
        other => panic!("{other} is no detail of the boathouse"),
    }
}

/// What the shop made of a joint: the intended detail with its deviations.
fn detailed(mark: &str, detail: &str) -> Detail {
    let wing = matches!(detail, "M2" | "M4");
    let mut made = intended(detail);
    // Habits of the two detailers, no deviations: where the class is written and what bodies look like.
    if told(mark) {
        made.bolts.class = Some(("8.8".into(), ClassIn::Material));
    }
    if wing {
        made.bolts.body = BoltBody::Mapped;
        made.welds = made.welds.map(|welds| Welds { bodies: true, ..welds });
    }
    match mark {
        "J02" => made.plate.thickness = 15.0,
        "J04" => made.bolts.rows[2] = 202.0,
        "J06" => made.plate.thickness = 30.0,
        "J08" => made.bolts.class = Some(("4.6".into(), ClassIn::Name)),
        "J10" | "J11" => made.stiffeners.clear(),
        "J12" => made.welds = made.welds.map(|welds| Welds { flange: 7.0, ..welds }),
        "J14" => made.bolts.class = None,
        "J16" => made.welds = None,
        "J18" => turn_over(&mut made, section("IPE 330").h),
        "J20" => made.plate.grade = "S355JR".into(),
        _ => {}
    }
    made
}

/// Marks whose joints the exchange tells by a relation: those of the first hall frame.
fn told(mark: &str) -> bool {
    matches!(mark, "J01" | "J02" | "J03" | "J04" | "J05" | "J06") || mark.starts_with("J2") && mark != "J20"
}

fn turn_over(detail: &mut Detail, h: f64) {
    let plate = &mut detail.plate;
    (plate.bottom, plate.top) = (h - plate.top, h - plate.bottom);
    detail.bolts.rows = detail.bolts.rows.iter().rev().map(|row| h - row).collect();
}

/// The whole building.
pub fn boathouse() -> Building {
    let columns = columns();
    let at = |mark: &str| columns.iter().position(|column| column.mark == mark).expect("a column of the boathouse");
    let beam = |mark: &str, of: &str, grade: &str, top: f64, ends: [End; 2]| Beam {
        mark: mark.into(),
        section: section(of),
        grade: grade.into(),
        top,
        ends,
    };
    let end = |(mark, detail, column): Place| End::Joint {
        column: at(column),
        joint: Box::new(Joint { mark: mark.into(), told: told(mark), detail: detailed(mark, detail) }),
    };
    let hall: [(&str, &str, f64, Place, Place); 9] = [
        ("B1", "UKB 457x191x74", 3600.0, ("J01", "M1", "C1"), ("J02", "M1", "C2")),
        ("B2", "UKB 457x191x74", 3600.0, ("J03", "M1", "C2"), ("J04", "M1", "C3")),
        ("B3", "UKB 457x191x74", 3600.0, ("J05", "M1", "C3"), ("J06", "M1", "C4")),
        ("B4", "UKB 457x191x74", 3600.0, ("J07", "M1", "C5"), ("J08", "M1", "C6")),
        // Drawn from east to west: its start is at C7.
        ("B5", "UKB 457x191x74", 3600.0, ("J10", "M1", "C7"), ("J09", "M1", "C6")),
        ("B6", "UKB 457x191x74", 3600.0, ("J11", "M1", "C7"), ("J12", "M1", "C8")),
        ("B7", "UKB 406x178x60", 6800.0, ("J21", "M3", "C1"), ("J22", "M3", "C2")),
        // A lighter section than the engineer's 406x178x60.
        ("B8", "UKB 406x178x54", 6800.0, ("J23", "M3", "C2"), ("J24", "M3", "C3")),
        ("B9", "UKB 406x178x60", 6800.0, ("J25", "M3", "C3"), ("J26", "M3", "C4")),
    ];
    let wing: [(&str, &str, f64, Place, Place); 4] = [
        ("W1", "IPE 360", 3300.0, ("J13", "M2", "K1"), ("J14", "M2", "K2")),
        ("W2", "IPE 360", 3300.0, ("J15", "M2", "K3"), ("J16", "M2", "K4")),
        ("W3", "IPE 330", 6000.0, ("J17", "M4", "K1"), ("J18", "M4", "K2")),
        ("W4", "IPE 330", 6000.0, ("J19", "M4", "K3"), ("J20", "M4", "K4")),
    ];
    let mut beams: Vec<Beam> =
        hall.map(|(mark, of, top, start, to)| beam(mark, of, "S355JR", top, [end(start), end(to)])).into();
    beams.extend(wing.map(|(mark, of, top, start, to)| beam(mark, of, "S275JR", top, [end(start), end(to)])));
    let landing = [end((NOT_SCHEDULED, "M4", "K1")), End::Free([24000.0, -2200.0])];
    beams.push(beam("W5", "IPE 330", "S275JR", 2100.0, landing));
    let storey = |name: &str, elevation| Storey { name: name.into(), elevation };
    let mut building = Building {
        name: "Boathouse".into(),
        site: [52000.0, 18500.0, 4200.0],
        storeys: vec![storey("Slipway", 0.0), storey("Boat store and clubroom", 3300.0), storey("Roof", 6000.0)],
        columns,
        beams,
        fittings: Vec::new(),
        boltings: Vec::new(),
        notches: Vec::new(),
        plates: PlateAs::Plate,
    };
    slip_house::add(&mut building);
    jetty::add(&mut building);
    building
}

/// Section, grade, upper end and direction of four columns, each with its mark and place.
type Row = (&'static str, &'static str, f64, Along, [(&'static str, f64, f64); 4]);

fn columns() -> Vec<Column> {
    let hall = [("C1", 0.0, 0.0), ("C2", 6500.0, 0.0), ("C3", 13000.0, 0.0), ("C4", 19500.0, 0.0)];
    let store = [("C5", 0.0, 7000.0), ("C6", 6500.0, 7000.0), ("C7", 13000.0, 7000.0), ("C8", 19500.0, 7000.0)];
    let wing = [("K1", 24000.0, 0.0), ("K2", 24000.0, 6500.0), ("K3", 28000.0, 0.0), ("K4", 28000.0, 6500.0)];
    let rows = [
        ("UKC 254x254x89", "S355JR", 7000.0, Along::X, hall),
        ("UKC 254x254x89", "S355JR", 3800.0, Along::X, store),
        ("HE 240 B", "S275JR", 6150.0, Along::Y, wing),
    ];
    let column = |(of, grade, top, depth, places): Row| {
        places.map(|(mark, x, y)| Column {
            mark: mark.into(),
            section: section(of),
            grade: grade.into(),
            at: [x, y],
            bottom: 0.0,
            top,
            depth,
        })
    };
    rows.into_iter().flat_map(column).collect()
}
