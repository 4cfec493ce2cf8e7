//! What theory says a joint comes to at its ends.

use faying::assess::end_plate::assess;
use faying::assess::{MomentResistance, Sense};
use faying::joints::EndPlateLayout;
use faying::rulebook::{RowForces, Rulebook};
use faying::units::mm;

use super::joint::{PLAIN, RULES, Sketch, resistance, stiffener};
use crate::close;

fn hogging(sketch: &Sketch, rulebook: &Rulebook) -> std::sync::Arc<MomentResistance> {
    resistance(&sketch.layout(rulebook), Sense::Hogging, 0.0, rulebook).unwrap()
}

/// Plate and column flange that do not bend: each row brings its two bolts' tension, the rows below in proportion to their
/// lever arms, since the bolts fail first (6.2.7.2(9)).
#[test]
fn rigid_plates_leave_the_bolts() {
    let rulebook = &*RULES;
    let rigid = Sketch { column: "HEM 300", beam: "HEB 400", t_p: 60.0, d: 16.0, class: "4.6", ..PLAIN };
    let joint = hogging(&rigid, rulebook);
    // Own arithmetic: M16 4.6, 0.9·400·157/1.25.
    let row = 2.0 * 0.9 * 400.0 * 157.0 / 1.25 / 1e3;
    close(joint.rows[0].force.kn(), row, 1e-9);
    for lower in &joint.rows[1..] {
        close(lower.force.kn(), row * (lower.lever_arm / joint.rows[0].lever_arm), 1e-9);
        close(lower.potential.kn(), row, 1e-9);
    }
}

/// A plate that is all but nothing carries nothing.
#[test]
fn the_thinnest_plate_carries_in_proportion_to_its_thickness_squared() {
    let rulebook = &*RULES;
    let [thin, double] = [3.0, 6.0].map(|t_p| hogging(&Sketch { t_p, ..PLAIN }, rulebook).without_welds.knm());
    close(double / thin, 4.0, 1e-9);
}

/// Compression that can carry no more leaves rows nearer to it without force, whatever they could bring.
#[test]
fn all_rows_together_bring_what_compression_carries() {
    let rulebook = &*RULES;
    let joint =
        hogging(&Sketch { column: "HEA 300", inner: 3, beam: "UKB 533x210x92", d: 24.0, t_p: 30.0, ..PLAIN }, rulebook);
    let compression = joint.components.iter().find(|c| c.id == "column-web-in-compression").unwrap();
    close(compression.at_full.kn(), compression.resistance.kn(), 1e-9);
}

/// A pair on one side of the web, or one short of the other flange, is none.
#[test]
fn a_stiffener_that_is_not_credited_is_none() {
    let rulebook = &*RULES;
    let moment = |layout: &EndPlateLayout| {
        let joint = assess(layout, &[], false, rulebook);
        [joint.hogging.unwrap().moment, joint.sagging.unwrap().moment]
    };
    let without = PLAIN.layout(rulebook);
    for change in [
        (|s| s.both_sides = false) as fn(&mut faying::joints::Stiffener),
        |s| s.full_depth = false,
        |s| s.thickness = mm(0.0),
        |s| s.outstand = mm(f64::NAN),
        |s| s.grade = super::joint::unknown("grade"),
    ] {
        let mut with = without.clone();
        for height in [393.0, 7.0] {
            let mut pair = stiffener(rulebook, "S355", height, 12.0, 120.0, mm(262.0));
            change(&mut pair);
            with.stiffeners.push(pair);
        }
        assert_eq!(moment(&with), moment(&without));
    }
}

/// The UK rule with a plate thin enough is the plastic solution without the rule of (9).
#[test]
fn thin_plates_let_rows_be_plastic() {
    let standard = Rulebook::embedded();
    let mut uk = standard.clone();
    uk.settings.row_forces = RowForces::ThinPlateOrLinear;
    // Own arithmetic: M24 8.8, 24/1.9·√(800/345) = 19.23 mm; the column's flange has 39.
    let joint = |t_p: f64, rulebook: &Rulebook| hogging(&Sketch { column: "HEM 300", t_p, d: 24.0, ..PLAIN }, rulebook);
    assert!(joint(19.2, &uk).notes.iter().all(|note| !note.contains("proportion")));
    assert!(joint(19.3, &uk).notes.iter().any(|note| note.contains("proportion")));
    assert!(joint(19.2, &uk).without_welds >= joint(19.2, &standard).without_welds);
}
