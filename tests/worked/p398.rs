//! SCI/BCSA P398 (2013), Example C.1: beams 533×210×92 on both sides of a column 254×254×107 with equal and opposite
//! moments, four rows of M24 8.8. Inputs and final results were read on a sheet that re-works the example; the values
//! between are computed from the clauses apart from this project.

use faying::assess::end_plate::{Demand, Opposite, assess};
use faying::assess::{Assessment, Component, MomentResistance};
use faying::intent::LoadCase;
use faying::joints::{BoltRow, Bolts, EndPlate, EndPlateLayout, FullButts, Held, MemberAt, Welds};
use faying::origin::{Datum, Known, Origin, Place};
use faying::rulebook::Rulebook;
use faying::units::{Length, kn, knm, mm};

use crate::close;

fn known<T>(value: T) -> Known<T> {
    Ok(Datum::new(value, Origin::Derived("the example".into())))
}

/// The joint; heights above the beam's soffit: row 1 is 40 above the top flange, then 100, 90 and a low fourth row.
pub fn example(rulebook: &Rulebook) -> EndPlateLayout {
    let member = |section: &str| MemberAt {
        guid: String::new(),
        mark: None,
        section: known(rulebook.section(section).unwrap().clone()),
        grade: known(rulebook.grade("S275").unwrap()),
    };
    let height_of_row_1 = 533.1 + 40.0;
    let row = |height: f64| BoltRow {
        height: mm(height),
        gauge: mm(100.0),
        edge_plate: mm(75.0),
        edge_column: mm((258.8 - 100.0) / 2.0),
    };
    EndPlateLayout {
        column: member("UKC 254x254x107"),
        beam: member("UKB 533x210x92"),
        plate: EndPlate {
            guid: String::new(),
            thickness: mm(25.0),
            width: mm(250.0),
            bottom: mm(height_of_row_1 + 50.0 - 670.0),
            top: mm(height_of_row_1 + 50.0),
            grade: known(rulebook.grade("S275").unwrap()),
        },
        bolts: Bolts {
            diameter: known(mm(24.0)),
            class: known("8.8".into()),
            hole: known(mm(26.0)),
            rows: [0.0, 100.0, 190.0, 460.0].map(|below| row(height_of_row_1 - below)).to_vec(),
            held: Held::default(),
        },
        welds: Welds {
            flange_top: known(throat(12.0)),
            flange_bottom: known(throat(12.0)),
            web: known(throat(8.0)),
            full: FullButts::default(),
        },
        haunch: None,
        stiffeners: Vec::new(),
        strengthening: Default::default(),
        column_above: None,
        column_below: None,
        not_credited: Vec::new(),
    }
}

fn throat(leg: f64) -> Length {
    mm(leg / 2.0_f64.sqrt())
}

fn hogging(both_sides: bool) -> std::sync::Arc<MomentResistance> {
    assessed(both_sides, &Rulebook::embedded()).hogging.unwrap()
}

fn assessed(both_sides: bool, rulebook: &Rulebook) -> Assessment {
    let case = LoadCase {
        moment: Some(knm(400.0)),
        shear: Some(kn(300.0)),
        axial: Some(kn(0.0)),
        ..LoadCase::blank("ULS", Place { file: "".into(), line: 0, column: 0 })
    };
    let opposite = if both_sides { Opposite::Moment(knm(400.0)) } else { Opposite::None };
    let demands = [Demand { case: &case, opposite }];
    assess(&example(rulebook), &demands, both_sides, rulebook)
}

fn component<'a>(resistance: &'a MomentResistance, start: &str) -> &'a Component {
    resistance.components.iter().find(|c| c.title.starts_with(start)).unwrap_or_else(|| panic!("no {start}"))
}

#[test]
fn components() {
    let joint = hogging(true);
    let half = 0.5; // half of the last printed digit
    for (title, expected) in [
        ("column flange in bending, row 1 (mode 2)", 398.0),
        ("column flange in bending, rows 1-2 (mode 2)", 698.0),
        ("column flange in bending, rows 2-3 (mode 2)", 691.0),
        ("column flange in bending, rows 1-3 (mode 2)", 991.0),
        ("end plate in bending, row 1 (mode 2)", 377.0),
        ("end plate in bending, row 2 (mode 3)", 407.0),
        ("end plate in bending, row 3 (mode 3)", 407.0),
        ("column web in compression", 867.0),
        ("beam flange and web in compression", 1254.0),
    ] {
        close(component(&joint, title).resistance.kn(), expected, half);
    }
}

#[test]
fn rows_cut_back_by_compression() {
    let joint = hogging(true);
    let expected = [(565.3, 377.0, 377.0), (465.3, 321.0, 321.0), (375.3, 293.0, 169.0)];
    assert_eq!(joint.rows.len(), expected.len());
    for (row, (lever_arm, potential, force)) in joint.rows.iter().zip(expected) {
        close(row.lever_arm.get(), lever_arm, 0.05);
        close(row.potential.kn(), potential, 0.5);
        close(row.force.kn(), force, 0.5);
    }
}

#[test]
fn moment_resistance() {
    // 424 kNm on the sheet; 426.0 computed from the clauses (+0.5 %: the sheet rounds on the way).
    let joint = hogging(true);
    close(joint.moment.knm(), 426.0, 0.05);
    close(joint.moment.knm(), 424.0, 0.005 * 424.0);
}

#[test]
fn one_sided() {
    // Own arithmetic with the example's A 13 640 mm²: Avc = 13640 − 2·258.8·20.5 + (12.8 + 2·12.7)·20.5 = 3812,
    // Vwp,Rd = 0.9·265·3812/√3 = 524.9, ω = 1/√(1 + 1.3 (255.6·12.8/3812)²) = 0.714, Fc,wc,Rd = 0.714·867 = 619.5.
    // (An A printed as 136 cm² gives 3772, 519, 0.711 and 616.)
    let joint = hogging(false);
    close(component(&joint, "column web panel in shear").resistance.kn(), 524.9, 0.5);
    close(component(&joint, "column web in compression").resistance.kn(), 619.5, 0.5);
}

#[test]
fn shear_as_the_handbook_counts_it() {
    // 499 kN on the sheet: two bolts free of tension and six fully used, for which the handbook prints 0.28 of Fv,Rd;
    // Table 3.4 itself gives 0.4/1.4.
    let mut rulebook = Rulebook::embedded();
    rulebook.settings.shear_with_full_tension = true;
    let shear = assessed(true, &rulebook).shear.unwrap();
    let one = 0.6 * 800.0 * 353.0 / 1.25 / 1e3;
    close(2.0 * one + 6.0 * 0.28 * one, 499.0, 0.5);
    close(shear.shear.kn(), (2.0 + 6.0 * 0.4 / 1.4) * one, 1e-6);
}
