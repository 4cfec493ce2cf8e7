//! The intended detail laid over the joint as detailed.

use faying::assess::Sense;
use faying::assess::end_plate::intended;
use faying::intent::{DiagonalForm, IntendedDetail, IntendedStiffener};
use faying::joints::EndPlateLayout;
use faying::units::{Length, mm};

use super::joint::{PLAIN, RULES, Sketch, resistance, stiffener};
use crate::close;

fn meant(layout: &EndPlateLayout, detail: &IntendedDetail) -> EndPlateLayout {
    intended(layout, detail, &RULES).unwrap()
}

fn both(layout: &EndPlateLayout) -> [f64; 2] {
    [Sense::Hogging, Sense::Sagging].map(|sense| resistance(layout, sense, 1.0, &RULES).unwrap().moment.knm())
}

fn same(a: &EndPlateLayout, b: &EndPlateLayout) {
    for (a, b) in both(a).into_iter().zip(both(b)) {
        close(a, b, 1e-9 * b);
    }
}

fn pair(thickness: f64) -> Option<Option<IntendedStiffener>> {
    Some(Some(IntendedStiffener { thickness: Some(mm(thickness)), grade: None, ..IntendedStiffener::default() }))
}

fn heights(layout: &EndPlateLayout) -> Vec<Length> {
    layout.bolts.rows.iter().map(|row| row.height).collect()
}

#[test]
fn nothing_stated_is_the_joint_as_detailed() {
    let detailed = Sketch { top: Some(12.0), bottom: Some(15.0), column_above: Some(90.0), ..PLAIN }.layout(&RULES);
    same(&meant(&detailed, &IntendedDetail::default()), &detailed);
}

/// What one joint intends is what another has: then both are one.
#[test]
fn the_stated_detail_counts_whatever_is_detailed() {
    let asked = Sketch { top: Some(12.0), bottom: Some(15.0), ..PLAIN };
    let wanted = asked.layout(&RULES);
    let detail = IntendedDetail {
        rows: Some(heights(&wanted)),
        gauge: Some(mm(asked.gauge)),
        bolt_diameter: Some(mm(asked.d)),
        bolt_class: Some(asked.class.into()),
        plate_thickness: Some(mm(asked.t_p)),
        plate_width: Some(wanted.plate.width),
        plate_top: Some(wanted.plate.top),
        plate_bottom: Some(wanted.plate.bottom),
        plate_grade: Some(asked.plate_grade.into()),
        flange_weld: Some(mm(asked.flange_weld)),
        web_weld: Some(mm(asked.web_weld)),
        stiffener_top: pair(12.0),
        stiffener_bottom: pair(15.0),
        ..IntendedDetail::default()
    };
    let one_sided = |layout: &mut EndPlateLayout| layout.stiffeners.iter_mut().for_each(|s| s.both_sides = false);
    let poor = Sketch { t_p: 12.0, d: 16.0, inner: 1, gauge: 100.0, extended: false, flange_weld: 4.0, ..PLAIN };
    let mut sides = Sketch { top: Some(8.0), bottom: Some(8.0), ..poor.clone() }.layout(&RULES);
    one_sided(&mut sides);
    for detailed in [poor.layout(&RULES), sides] {
        let meant = meant(&detailed, &detail);
        assert_eq!(heights(&meant), heights(&wanted));
        assert_eq!(meant.bolts.rows.iter().map(|r| r.edge_plate).collect::<Vec<_>>(), vec![mm(45.0); 4]);
        assert!(meant.stiffeners.len() == 2 && meant.stiffeners.iter().all(|s| s.both_sides && s.full_depth));
        // A pair where there was none, or one side only, reaches to the flange's edge: 5 mm more than the sketch's. Its own
        // weld is not known, so m_2 is measured to its face.
        let mut free = wanted.clone();
        for (s, own) in free.stiffeners.iter_mut().zip(&meant.stiffeners) {
            s.outstand += mm(5.0);
            s.weld = own.weld.clone();
        }
        same(&meant, &free);
    }
}

/// A pair that is intended to be absent is taken away; one elsewhere stays.
#[test]
fn no_stiffener_intended() {
    let mut detailed = Sketch { top: Some(12.0), bottom: Some(15.0), ..PLAIN }.layout(&RULES);
    detailed.stiffeners.push(stiffener(&RULES, "S355", 200.0, 12.0, 120.0, mm(262.0)));
    let none = IntendedDetail { stiffener_top: Some(None), stiffener_bottom: Some(None), ..IntendedDetail::default() };
    let left = meant(&detailed, &none).stiffeners;
    assert_eq!(left.iter().map(|s| s.height).collect::<Vec<_>>(), [mm(200.0)]);
}

/// The column's ends stay where they are when the rows move.
#[test]
fn the_columns_ends_stay() {
    let mut detailed = Sketch { column_above: Some(90.0), ..PLAIN }.layout(&RULES);
    detailed.column_below = Some(mm(1000.0));
    let top = detailed.bolts.rows[0].height;
    let rows = vec![top + mm(20.0), mm(330.0), mm(80.0)];
    let meant = meant(&detailed, &IntendedDetail { rows: Some(rows), ..IntendedDetail::default() });
    assert_eq!(meant.column_above, Some(mm(70.0)));
    assert_eq!(meant.column_below, Some(mm(1020.0)));
}

/// Rows that lie the other way up: the plate that is extended below where it should be above.
#[test]
fn a_joint_handed_wrong() {
    let wanted = PLAIN.layout(&RULES);
    let turned = super::joint::mirrored(&wanted);
    let detail = IntendedDetail {
        rows: Some(heights(&wanted)),
        plate_top: Some(wanted.plate.top),
        plate_bottom: Some(wanted.plate.bottom),
        ..IntendedDetail::default()
    };
    same(&meant(&turned, &detail), &wanted);
}

/// What one joint intends is what another has: web plates, diagonals, backing plates and a pair that ends in the web.
#[test]
fn the_stated_strengthening_counts_whatever_is_detailed() {
    let stated = |thickness: f64, throat: Option<f64>| {
        Some(Some(IntendedStiffener {
            thickness: Some(mm(thickness)),
            grade: Some("S355".into()),
            throat: throat.map(mm),
            length: None,
        }))
    };
    // Panel and column flange govern, the web in compression does not.
    let bare = Sketch {
        column: "HEA 300",
        beam: "UKB 533x210x92",
        inner: 3,
        d: 30.0,
        gauge: 150.0,
        t_p: 40.0,
        flange_weld: 15.0,
        web_weld: 10.0,
        bottom: Some(15.0),
        ..PLAIN
    };
    let bare = bare.layout(&RULES);
    let plain = both(&bare);
    let short =
        IntendedStiffener { thickness: Some(mm(12.0)), throat: Some(mm(6.0)), length: Some(mm(160.0)), grade: None };
    let details = [
        IntendedDetail { web_plates: stated(10.0, Some(7.0)), ..IntendedDetail::default() },
        IntendedDetail { diagonals: stated(15.0, Some(7.0)), ..IntendedDetail::default() },
        IntendedDetail {
            diagonals: stated(15.0, Some(7.0)),
            diagonal_form: Some(DiagonalForm::K),
            ..IntendedDetail::default()
        },
        IntendedDetail { backing_plates: stated(10.0, None), ..IntendedDetail::default() },
        IntendedDetail { stiffener_top: Some(Some(short)), ..IntendedDetail::default() },
    ];
    for detail in &details {
        let strong = meant(&bare, detail);
        assert!(both(&strong)[0] > plain[0], "{detail:?}");
        // Laid over itself it stays; where none are intended they go.
        same(&meant(&strong, detail), &strong);
    }
    let none = IntendedDetail {
        web_plates: Some(None),
        diagonals: Some(None),
        backing_plates: Some(None),
        stiffener_top: Some(None),
        ..IntendedDetail::default()
    };
    for detail in &details {
        same(&meant(&meant(&bare, detail), &none), &bare);
    }
}
