//! End-plate splices: laws on invented ones.
#![allow(non_snake_case)]

use faying::assess::end_plate::{Demand, Opposite, assess};
use faying::assess::{Assessment, MomentResistance, Sense};
use faying::joints::{EndPlateLayout, Half, SpliceLayout};
use faying::rulebook::Rulebook;
use faying::units::{Area, Length, mm};
use proptest::prelude::*;

use super::joint::{PLAIN, RULES, Sketch, case, known, resistance, section, sketches};

fn half(layout: &EndPlateLayout) -> Half {
    Half { beam: layout.beam.clone(), soffit: Length::ZERO, plate: layout.plate.clone(), welds: layout.welds.clone() }
}

/// Two sketches' beams bolted to each other by the rows of the first.
pub fn splice(one: &Sketch, two: &Sketch, rulebook: &Rulebook) -> SpliceLayout {
    let (one, two) = (one.layout(rulebook), two.layout(rulebook));
    let mut bolts = one.bolts.clone();
    for row in &mut bolts.rows {
        row.edge_plate = 0.5 * (one.plate.width - row.gauge);
        row.edge_column = 0.5 * (two.plate.width - row.gauge);
    }
    SpliceLayout { supported: half(&one), supporting: half(&two), bolts }
}

/// The two halves change places.
fn swapped(splice: &SpliceLayout) -> SpliceLayout {
    let by = splice.supporting.soffit;
    let moved = |half: &Half| {
        let mut half = half.clone();
        half.soffit -= by;
        half.plate.top -= by;
        half.plate.bottom -= by;
        half
    };
    let mut bolts = splice.bolts.clone();
    for row in &mut bolts.rows {
        row.height -= by;
        std::mem::swap(&mut row.edge_plate, &mut row.edge_column);
    }
    SpliceLayout { supported: moved(&splice.supporting), supporting: moved(&splice.supported), bolts }
}

fn solved(splice: &SpliceLayout, rulebook: &Rulebook) -> Assessment {
    let case = case(Some(1.0), Some(0.0), Some(0.0));
    assess(splice, &[Demand { case: &case, opposite: Opposite::None }], false, rulebook)
}

fn moment(splice: &SpliceLayout, rulebook: &Rulebook) -> std::sync::Arc<MomentResistance> {
    let assessment = solved(splice, rulebook);
    assessment.hogging.unwrap_or_else(|| panic!("{:?}", assessment.gaps))
}

/// Both bending senses and the shear, in kNm and kN; 0 where there is none.
fn all(splice: &SpliceLayout, rulebook: &Rulebook) -> [f64; 3] {
    let assessment = solved(splice, rulebook);
    let moment = |m: &Option<std::sync::Arc<MomentResistance>>| m.as_ref().map_or(0.0, |m| m.moment.knm());
    [moment(&assessment.hogging), moment(&assessment.sagging), assessment.shear.map_or(0.0, |v| v.shear.kn())]
}

fn same(a: &[f64], b: &[f64]) -> bool {
    a.iter().zip(b).all(|(a, b)| (a - b).abs() <= 1e-9 * (1.0 + a.abs()))
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(48))]

    /// Which half is called the supported one changes nothing, whatever the two are.
    #[test]
    fn the_halves_may_change_places(one in sketches(), two in sketches(), lower in -3.0..3.0f64) {
        let mut joint = splice(&one, &Sketch { beam: one.beam, extended: one.extended, ..two }, &RULES);
        joint.supporting.soffit = mm(lower);
        prop_assert!(same(&all(&joint, &RULES), &all(&swapped(&joint), &RULES)));
    }

    /// The flange and web of a column that is stronger than any leave the end plate's own limits, and so does a second
    /// plate that is thicker than any: the joint on the column and the splice are then one.
    #[test]
    fn a_column_that_never_gives_is_a_plate_that_never_gives(one in sketches()) {
        let rules = &*RULES;
        let one = Sketch { top: None, bottom: None, column_above: None, ..one };
        let mut on_column = one.layout(rules);
        let mut column = section(rules, "HEB 300");
        (column.t_f, column.t_w) = (mm(100.0), mm(40.0));
        (column.h, column.r, column.a_v_z) = (mm(1500.0), Some(mm(1.0)), Area(100_000.0));
        on_column.column.section = known(column);
        let mut joint = splice(&one, &one, rules);
        let mut beam = section(rules, one.beam);
        (beam.t_w, beam.w_pl_y, beam.w_el_y) = (mm(40.0), 10.0 * beam.w_pl_y, 10.0 * beam.w_el_y);
        joint.supporting.beam.section = known(beam);
        joint.supporting.plate.thickness = mm(100.0);
        joint.supporting.plate.width = mm(1000.0) + joint.bolts.rows[0].gauge;
        for row in on_column.bolts.rows.iter_mut().chain(&mut joint.bolts.rows) {
            row.edge_column = mm(500.0);
        }
        let alone = resistance(&on_column, Sense::Hogging, 0.0, rules).unwrap();
        let spliced = moment(&joint, rules);
        let [a, b] = [&alone, &spliced].map(|m| m.without_welds.knm());
        prop_assert!(same(&[a], &[b]), "{a} {b}: {} / {}", alone.governed_by, spliced.governed_by);
    }
}

/// Equal halves: one plate's limits, named once.
#[test]
fn equal_halves_are_named_once() {
    let joint = splice(&PLAIN, &PLAIN, &RULES);
    let moment = moment(&joint, &RULES);
    let titles: Vec<_> = moment.components.iter().map(|c| &c.title).collect();
    assert!(titles.iter().any(|title| title.contains("end plate in bending, both sides, row 1")), "{titles:?}");
    assert!(!titles.iter().any(|title| title.contains("support") || title.contains("column")), "{titles:?}");
    // Noise of coordinates makes no difference between them.
    let mut noisy = joint.clone();
    noisy.supporting.plate.top += mm(1e-9);
    assert!(same(&all(&joint, &RULES), &all(&noisy, &RULES)));
    assert!(moment.governed_by == self::moment(&noisy, &RULES).governed_by);
}

/// The weaker half governs and is named, on whichever side it is.
#[test]
fn the_weaker_half_governs() {
    let (weak, strong) = (Sketch { t_p: 12.0, ..PLAIN }, Sketch { t_p: 25.0, ..PLAIN });
    let unequal = moment(&splice(&strong, &weak, &RULES), &RULES);
    assert!(unequal.governed_by.contains("supporting side"), "{}", unequal.governed_by);
    let turned = moment(&splice(&weak, &strong, &RULES), &RULES);
    assert!(turned.governed_by.contains("supported side"), "{}", turned.governed_by);
    assert!(same(&[unequal.moment.knm()], &[moment(&splice(&weak, &weak, &RULES), &RULES).moment.knm()]));
    assert!(unequal.moment < moment(&splice(&strong, &strong, &RULES), &RULES).moment);
}

/// Plates that never give: mode 3, the bolts at F_t,Rd. One row at 316.5 - 6.75 mm from the middle of the compression flange
/// (own arithmetic: M20 8.8, A_s = 245 mm², F_t,Rd = 0.9 · 800 · 245 / 1.25 = 141.1 kN).
#[test]
fn thick_plates_give_the_bolts() {
    let thick = Sketch { t_p: 80.0, extended: false, inner: 1, plate_grade: "S355", ..PLAIN };
    let moment = moment(&splice(&thick, &thick, &RULES), &RULES);
    let (z, F) = ((400.0 - 13.5 - 55.0 - 6.75) / 1000.0, 2.0 * 0.9 * 800.0 * 245.0 / 1.25 / 1000.0);
    assert!((moment.without_welds.knm() - F * z).abs() < 1e-6, "{} {}", moment.without_welds.knm(), F * z);
}

/// Where the compression flanges do not meet, nothing is said about that sense; the other is as it was.
#[test]
fn compression_flanges_must_meet() {
    let deep = Sketch { beam: "IPE 500", ..PLAIN };
    let mut joint = splice(&PLAIN, &deep, &RULES);
    // Top flanges level: the deeper one hangs 100 mm lower.
    let by = mm(-100.0);
    joint.supporting.soffit = by;
    joint.supporting.plate.top += by;
    joint.supporting.plate.bottom += by;
    let assessment = solved(&joint, &RULES);
    assert!(assessment.hogging.is_none());
    let gaps = format!("{:?}", assessment.gaps);
    assert!(gaps.contains("the compression flanges of the two beams lie"), "{gaps}");
    assert!(assessment.sagging.is_some_and(|m| m.moment.knm() > 0.0));
}

/// Both plates of equal halves bend and are clamped, though they are computed once: a hair of difference changes nothing.
#[test]
fn equal_halves_are_no_stiffer_than_nearly_equal_ones() {
    let joint = splice(&PLAIN, &PLAIN, &RULES);
    let mut nearly = joint.clone();
    nearly.supporting.plate.thickness += mm(1e-5);
    let initial = |joint: &SpliceLayout| moment(joint, &RULES).stiffness.as_ref().unwrap().initial;
    let (one, other) = (initial(&joint), initial(&nearly));
    assert!((one / other - 1.0).abs() < 1e-5, "{one:?} {other:?}");
    assert!(moment(&nearly, &RULES).governed_by == moment(&joint, &RULES).governed_by);
}
