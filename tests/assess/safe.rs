//! What once passed, or could have, without being proven. Each of these failed before it was mended.

use faying::assess::end_plate::Opposite;
use faying::assess::{About, Component, MomentResistance, Sense, State};
use faying::joints::EndPlateLayout;
use faying::rulebook::{Rulebook, Section};
use faying::units::{Force, Length, kn, knm, mm};
use proptest::prelude::*;

use super::joint::{
    PLAIN, RULES, Sketch, asked, case, known, resistance, section, sketches, state, stiffener, unknown, verdict,
};
use super::plastic::rows_of;
use crate::close;

fn hogging(layout: &EndPlateLayout, beta: f64) -> std::sync::Arc<MomentResistance> {
    resistance(layout, Sense::Hogging, beta, &RULES).unwrap()
}

fn component<'a>(moment: &'a MomentResistance, title: &str) -> &'a Component {
    moment.components.iter().find(|c| c.title == title).unwrap_or_else(|| {
        panic!("no {title} among {:?}", moment.components.iter().map(|c| &c.title).collect::<Vec<_>>())
    })
}

pub fn plain(change: impl Fn(&mut EndPlateLayout)) -> EndPlateLayout {
    let mut layout = PLAIN.layout(&RULES);
    change(&mut layout);
    layout
}

/// Small actions that the plain joint carries with ease.
fn carries(layout: &EndPlateLayout) -> State {
    let small = case(Some(20.0), Some(20.0), Some(0.0));
    asked(layout, &small, Opposite::None, &RULES).carries()
}

#[test]
fn the_plain_joint_carries() {
    assert_eq!(carries(&plain(|_| ())), State::Met);
}

/// Every number of the layout in turn is none at all: never met.
#[test]
fn a_number_that_is_none_proves_nothing() {
    type Change = fn(&mut EndPlateLayout, Length);
    let changes: [(&str, Change); 22] = [
        ("thickness", |l, x| l.plate.thickness = x),
        ("width", |l, x| l.plate.width = x),
        ("bottom", |l, x| l.plate.bottom = x),
        ("top", |l, x| l.plate.top = x),
        ("first row", |l, x| l.bolts.rows[0].height = x),
        ("last row", |l, x| l.bolts.rows.last_mut().unwrap().height = x),
        ("gauge", |l, x| l.bolts.rows[1].gauge = x),
        ("plate edge", |l, x| l.bolts.rows[1].edge_plate = x),
        ("flange edge", |l, x| l.bolts.rows[1].edge_column = x),
        ("bolt", |l, x| l.bolts.diameter = known(x)),
        ("hole", |l, x| l.bolts.hole = known(x)),
        ("upper weld", |l, x| l.welds.flange_top = known(x)),
        ("lower weld", |l, x| l.welds.flange_bottom = known(x)),
        ("web weld", |l, x| l.welds.web = known(x)),
        ("above", |l, x| l.column_above = Some(x)),
        ("below", |l, x| l.column_below = Some(x)),
        ("column h", |l, x| l.column.section.as_mut().unwrap().value.h = x),
        ("column t_w", |l, x| l.column.section.as_mut().unwrap().value.t_w = x),
        ("column r", |l, x| l.column.section.as_mut().unwrap().value.r = Some(x)),
        ("beam h", |l, x| l.beam.section.as_mut().unwrap().value.h = x),
        ("beam t_f", |l, x| l.beam.section.as_mut().unwrap().value.t_f = x),
        ("beam r", |l, x| l.beam.section.as_mut().unwrap().value.r = Some(x)),
    ];
    for (what, change) in changes {
        for value in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
            let layout = plain(|layout| change(layout, mm(value)));
            assert_ne!(carries(&layout), State::Met, "{what} {value}");
        }
    }
    for (m, v, n) in [(f64::NAN, 1.0, 0.0), (1.0, f64::NAN, 0.0), (1.0, 1.0, f64::NAN)] {
        let odd = case(Some(m), Some(v), Some(n));
        assert_eq!(asked(&plain(|_| ()), &odd, Opposite::None, &RULES).carries(), State::Unproven);
    }
    let odd = Opposite::Moment(knm(f64::NAN));
    let small = case(Some(20.0), Some(20.0), Some(0.0));
    let assessment = asked(&plain(|_| ()), &small, odd, &RULES);
    close(assessment.cases[0].moment.as_ref().unwrap().beta, 2.0, 0.0);
}

/// A resistance that comes to nothing, or less, is no proof either.
#[test]
fn nothing_is_left_of_impossible_sizes() {
    type Change = fn(&mut EndPlateLayout);
    let changes: [(&str, Change); 9] = [
        ("no throat", |l| l.welds.web = known(mm(0.0))),
        ("a throat below the least that counts, 4.5.2(2)", |l| l.welds.flange_top = known(mm(2.9))),
        ("a hole larger than normal, 3.6.1(4)", |l| l.bolts.hole = known(mm(26.0))),
        ("a hole smaller than the bolt", |l| l.bolts.hole = known(mm(19.0))),
        ("bolts in each other", |l| l.bolts.rows[1].height = l.bolts.rows[2].height + mm(5.0)),
        ("rows in the wrong order", |l| l.bolts.rows.reverse()),
        ("a plate that leaves out the lower flange", |l| l.plate.bottom = mm(40.0)),
        ("a plate that leaves out the upper flange", |l| {
            l.bolts.rows.remove(0);
            l.plate.top = mm(380.0);
        }),
        ("no plate", |l| l.plate.thickness = mm(-20.0)),
    ];
    for (what, change) in changes {
        assert_eq!(carries(&plain(change)), State::Unproven, "{what}");
    }
}

#[test]
fn a_stiffener_in_a_rows_own_plane_leaves_no_room() {
    let rulebook = &*RULES;
    let layout = plain(|layout| {
        let height = layout.bolts.rows[1].height.get();
        layout.stiffeners = vec![stiffener(rulebook, "S355", height, 12.0, 120.0, mm(262.0))];
    });
    assert_eq!(carries(&layout), State::Unproven);
}

/// A row's flange is held only as far as the stiffener can bear: one whose plates end within the root radius bears nothing.
#[test]
fn a_stiffener_without_bearing_area_is_none() {
    let rulebook = &*RULES;
    for inner in 1..4 {
        // e ≤ 3.2 m: beyond, the largest α of the chart is less than the plain pattern.
        let thin = Sketch { column: "HEA 300", gauge: 120.0, t_p: 25.0, inner, grade: "S235", ..PLAIN };
        let without = thin.layout(rulebook);
        let mut with = Sketch { top: Some(3.0), bottom: Some(3.0), ..thin }.layout(rulebook);
        for pair in &mut with.stiffeners {
            pair.outstand = section(rulebook, "HEA 300").r.unwrap();
        }
        for beta in [0.0, 1.0, 2.0] {
            let [a, b] = [&without, &with].map(|layout| hogging(layout, beta).without_welds.knm());
            // Both pairs give the panel (6.8) its frame: only where the panel does not govern are they the same.
            if beta == 0.0 {
                close(b, a, 1e-9 * a);
            }
        }
    }
}

/// Rows 1 | pair | 2, 3: the pair's area beside row 1 is not there again for rows 2-3.
#[test]
fn a_stiffeners_area_counts_once() {
    let rulebook = &*RULES;
    let sketch = Sketch { top: Some(12.0), ..PLAIN };
    let joint = hogging(&sketch.layout(rulebook), 0.0);
    let web = |rows: &str| component(&joint, &format!("column web and stiffener in tension, {rows}")).resistance;
    let without = hogging(&PLAIN.layout(rulebook), 0.0);
    let plain = |rows: &str| component(&without, &format!("column web in tension, {rows}")).resistance;
    let area = web("row 1") - plain("row 1");
    assert!(area > kn(100.0));
    for rows in ["rows 1-2", "rows 1-3", "rows 2-3"] {
        close((web(rows) - plain(rows)).kn(), area.kn(), 1e-6);
    }
}

#[test]
fn a_stiffener_wider_than_the_columns_flange_counts_to_its_edge() {
    let rulebook = &*RULES;
    let column = section(rulebook, "HEB 300");
    let of = |outstand: f64| {
        let mut layout = Sketch { bottom: Some(15.0), ..PLAIN }.layout(rulebook);
        layout.stiffeners[0].outstand = mm(outstand);
        component(&hogging(&layout, 0.0), "stiffened column web in compression").resistance
    };
    assert_eq!(of(200.0), of(0.5 * (column.b - column.t_w).get()));
}

/// Table 3.4: shear beside tension needs the bolts' tension with prying; a T-stub of several rows at its resistance may have
/// every bolt fully used, not only those of the row that is at its own.
#[test]
fn bolts_of_a_group_are_used_as_far_as_the_group() {
    // Own reading of the same example as in the worked tests: rows 1-2 of the column flange are at their 698 kN.
    let rulebook = &*RULES;
    let layout = crate::worked::p398::example(rulebook);
    let joint = hogging(&layout, 0.0);
    close(joint.rows[1].bolt_share, 1.0, 1e-9);
}

/// EN 1993-1-8 6.2.6.7(1) with EN 1993-1-1 6.2.8: own arithmetic, IPE 400 S355 with half of V_pl,Rd and with 0.8 of it.
#[test]
fn the_beams_flange_is_weaker_beside_a_large_shear() {
    let rulebook = &*RULES;
    let beam = section(rulebook, "IPE 400");
    let v_pl = beam.a_v_z.get() * 355.0 / 3.0_f64.sqrt() / 1e3;
    let flange = |share: f64| {
        let required = case(Some(1.0), Some(share * v_pl), Some(0.0));
        let assessment = asked(&PLAIN.layout(rulebook), &required, Opposite::None, rulebook);
        let moment = assessment.cases[0].moment.clone();
        (moment.map(|m| component(&m, "beam flange and web in compression").resistance.kn()), assessment)
    };
    let arm = (beam.h - beam.t_f).get();
    close(flange(0.5).0.unwrap(), beam.w_pl_y.get() * 355.0 / arm / 1e3, 1e-6);
    let web = (beam.h - 2.0 * beam.t_f).get() * beam.t_w.get();
    let rho = (2.0_f64 * 0.8 - 1.0).powi(2);
    let reduced = beam.w_pl_y.get() - rho * web * web / (4.0 * beam.t_w.get());
    close(flange(0.8).0.unwrap(), reduced * 355.0 / arm / 1e3, 1e-6);
    let (none, beyond) = flange(1.01);
    assert!(none.is_none());
    assert_eq!(state(&beyond, About::Moment), State::Unproven);
}

/// Below the compression flange the web ends with the column: a beam at the head of a column, lower side in tension.
#[test]
fn the_web_in_compression_ends_with_the_column() {
    let rulebook = &*RULES;
    let web = |above: Option<f64>| {
        let layout = Sketch { column_above: above, ..PLAIN }.layout(rulebook);
        let joint = resistance(&layout, Sense::Sagging, 0.0, rulebook).unwrap();
        component(&joint, "column web in compression").clone()
    };
    let b_eff = |c: &Component| c.working.steps.iter().find(|s| s.symbol == "b_eff").unwrap().value.value;
    let full = b_eff(&web(None));
    // Row 1 lies 45 mm above the flange's top, the flange's middle half its thickness lower.
    let t_f = section(rulebook, "IPE 400").t_f.get();
    close(b_eff(&web(Some(20.0))), 0.5 * full + 20.0 + 45.0 + 0.5 * t_f, 1e-9);
    close(b_eff(&web(Some(500.0))), full, 1e-9);
    assert!(web(Some(20.0)).resistance < web(None).resistance);
}

/// The least moment at which the flange's weld gives way: when the rows' force reaches it, though the flange could bring less
/// than all rows together.
#[test]
fn a_flange_weld_weaker_than_flange_and_rows() {
    let rulebook = &*RULES;
    let sketch =
        Sketch { beam: "IPE 300", column: "HEB 300", d: 24.0, flange_weld: 3.0, t_p: 30.0, gauge: 120.0, ..PLAIN };
    let layout = sketch.layout(rulebook);
    let joint = hogging(&layout, 0.0);
    let beam = section(rulebook, "IPE 300");
    let flange = beam.b.get() * beam.t_f.get() * 355.0 / 1e3;
    let rows: f64 = joint.rows[..2].iter().map(|row| row.force.kn()).sum();
    let weld = component(&joint, "weld at the tension flange");
    assert!(weld.resistance.kn() < flange && flange < rows, "{} {flange} {rows}", weld.resistance);
    let by_weld = weld.resistance.kn() / rows;
    assert!(joint.moment.knm() <= by_weld * joint.without_welds.knm() * (1.0 + 1e-9));
    // What the flange can't bring comes through the web, if the flange's weld is strong enough to let it.
    let strong = hogging(&Sketch { flange_weld: 9.0, ..sketch }.layout(rulebook), 0.0);
    let rows: f64 = strong.rows[..2].iter().map(|row| row.force.kn()).sum();
    close(component(&strong, "weld at the web, row 2").at_full.kn(), rows - flange, 1e-6);
}

/// Rows 90 mm apart share the web's fillets between them: together they have no more than the group's length.
#[test]
fn the_webs_fillets_are_not_counted_twice() {
    let rulebook = &*RULES;
    let joint = hogging(&Sketch { beam: "UKB 533x210x92", inner: 3, ..PLAIN }.layout(rulebook), 0.0);
    let weld = |rows: &str| component(&joint, &format!("weld at the web, {rows}")).resistance.kn();
    assert!(weld("rows 3-4") < weld("row 3") + weld("row 4"));
    let web = |rows: &str| component(&joint, &format!("beam web in tension, {rows}")).resistance.kn();
    close(weld("rows 3-4") / weld("row 3"), web("rows 3-4") / web("row 3"), 1e-9);
}

/// A fillet needs the plate under it.
#[test]
fn no_weld_where_there_is_no_plate() {
    let weld = |change: fn(&mut EndPlateLayout)| {
        component(&hogging(&plain(change), 0.0), "weld at the tension flange").resistance.kn()
    };
    let full = weld(|_| ());
    let beam = section(&RULES, "IPE 400");
    // Without the outer fillet: own arithmetic, lengths b and b − t_w − 2r.
    let inner = (beam.b - beam.t_w - 2.0 * beam.r.unwrap()).get();
    let flush = weld(|l| {
        l.bolts.rows.remove(0);
        l.plate.top = mm(400.0);
    });
    close(flush / full, inner / (inner + beam.b.get()), 1e-9);
    assert!(weld(|l| l.plate.width = mm(150.0)) < full);
}

#[test]
fn flange_and_web_are_classed_by_their_own_strength() {
    // Own arithmetic: web 466/6.01 = 77.5; 83ε is 76.7 with the web's 275 N/mm² and 78.2 with the flange's 265.
    let mut rulebook = Rulebook::embedded();
    rulebook.settings.strength_by_flange = false;
    let beam = Section::from_sizes("welded", mm(500.0), mm(200.0), mm(6.01), mm(17.0), Some(mm(0.0)), false).unwrap();
    let mut layout = Sketch { beam: "IPE 500", grade: "S275", ..PLAIN }.layout(&rulebook);
    layout.beam.section = known(beam);
    let joint = resistance(&layout, Sense::Hogging, 1.0, &rulebook).unwrap();
    assert!(joint.notes.iter().any(|note| note.contains("class 3")), "{:?}", joint.notes);
}

/// With M not stated, or one that can't be assessed, the bolts' tension is not known: V is not proven by bolts that are free
/// of it, and not disproven either.
#[test]
fn shear_beside_a_moment_that_nobody_knows() {
    let rulebook = &*RULES;
    let layout = PLAIN.layout(rulebook);
    let one = 0.6 * 800.0 * 245.0 / 1.25 / 1e3;
    let bolts = 2.0 * layout.bolts.rows.len() as f64;
    let shear = |moment: Option<f64>, layout: &EndPlateLayout, v: f64| {
        let assessment = asked(layout, &case(moment, Some(v), Some(0.0)), Opposite::None, rulebook);
        (verdict(&assessment, About::Shear).resistance.unwrap(), state(&assessment, About::Shear))
    };
    let (resistance, state) = shear(None, &layout, 0.6 * bolts * one);
    assert!(resistance <= bolts * one * 0.4 / 1.4 + 1e-9);
    assert_eq!(state, State::Unproven);
    let two_outside = plain(|l| {
        let row = l.bolts.rows[0].clone();
        l.bolts.rows.insert(0, faying::joints::BoltRow { height: row.height + mm(60.0), ..row });
        l.plate.top += mm(60.0);
    });
    let (resistance, state) = shear(Some(20.0), &two_outside, 400.0);
    assert!(resistance <= (bolts + 2.0) * one * 0.4 / 1.4 + 1e-9);
    assert_eq!(state, State::Unproven);
}

#[test]
fn no_moment_and_no_row_in_tension_holds_nobody_back() {
    let rulebook = &*RULES;
    let layout = plain(|l| l.bolts.rows.retain(|row| row.height < mm(100.0)));
    let assessment = asked(&layout, &case(Some(0.0), Some(10.0), Some(0.0)), Opposite::None, rulebook);
    assert_eq!(state(&assessment, About::Weld), State::Met);
    assert_eq!(assessment.carries(), State::Met);
    let some = asked(&layout, &case(Some(1.0), Some(10.0), Some(0.0)), Opposite::None, rulebook);
    assert_eq!(some.carries(), State::NotMet);
}

/// One at a time, nobody states something: never met.
#[test]
fn what_is_missing_is_not_proven() {
    type Change = fn(&mut EndPlateLayout);
    let changes: [Change; 12] = [
        |l| l.column.section = unknown("section"),
        |l| l.column.grade = unknown("grade"),
        |l| l.beam.section = unknown("section"),
        |l| l.beam.grade = unknown("grade"),
        |l| l.plate.grade = unknown("grade"),
        |l| l.bolts.diameter = unknown("diameter"),
        |l| l.bolts.class = unknown("class"),
        |l| l.bolts.class = known("12.9".into()),
        |l| l.bolts.hole = unknown("hole"),
        |l| l.welds.flange_top = unknown("weld"),
        |l| l.welds.flange_bottom = unknown("weld"),
        |l| l.welds.web = unknown("weld"),
    ];
    for (i, change) in changes.into_iter().enumerate() {
        assert_eq!(carries(&plain(change)), State::Unproven, "change {i}");
    }
    for (m, v, n) in [(None, Some(1.0), Some(0.0)), (Some(1.0), None, Some(0.0)), (Some(1.0), Some(1.0), None)] {
        let assessment = asked(&plain(|_| ()), &case(m, v, n), Opposite::None, &RULES);
        assert_eq!(assessment.carries(), State::Unproven);
    }
    assert_eq!(faying::assess::end_plate::assess(&plain(|_| ()), &[], false, &RULES).carries(), State::Unproven);
}

#[test]
fn no_moment_has_no_sign() {
    let rulebook = &*RULES;
    for zero in [0.0, -0.0] {
        let assessment =
            asked(&PLAIN.layout(rulebook), &case(Some(zero), Some(0.0), Some(-0.0)), Opposite::None, rulebook);
        assert_eq!(assessment.carries(), State::Met);
        assert_eq!(assessment.cases[0].moment.as_ref().unwrap().sense, Sense::Hogging);
    }
    // Against a moment on the other side β is at its upper bound, against none it is that of one side.
    for (other, beta) in [(50.0, 2.0), (0.0, 1.0)] {
        let assessment = asked(
            &PLAIN.layout(rulebook),
            &case(Some(0.0), Some(0.0), Some(0.0)),
            Opposite::Moment(knm(other)),
            rulebook,
        );
        assert_eq!(assessment.cases[0].moment.as_ref().unwrap().beta, beta);
    }
}

proptest! {
    /// Every T-stub that is used leaves its rows' bolts at least as far used.
    #[test]
    fn bolts_are_used_as_far_as_any_of_their_t_stubs(sketch in sketches(), beta in 0.0..2.0f64) {
        let rulebook = &*RULES;
        let Ok(joint) = resistance(&sketch.layout(rulebook), Sense::Hogging, beta, rulebook) else { return Ok(()) };
        for c in joint.components.iter().filter(|c| c.id.ends_with("-in-bending") && c.at_full > Force::ZERO) {
            let used = c.at_full / c.resistance;
            let (low, high) = rows_of(&c.title).unwrap();
            let least = joint.rows.iter().filter(|row| (low..=high).contains(&row.row));
            for row in least {
                prop_assert!(row.bolt_share >= used * (1.0 - 1e-9), "{} {used} {}", c.title, row.bolt_share);
            }
        }
        let most = joint.rows.iter().map(|row| row.bolt_share).fold(0.0, f64::max);
        prop_assert!(most <= 1.0 + 1e-9);
    }
}

/// In compression no clause credits a pair that ends in the web; in tension it holds the flange, and is credited.
#[test]
fn a_joint_that_fails_with_a_partial_depth_stiffener_in_compression_is_not_proven_to_fail() {
    let ends = |height: Option<f64>, moment: f64| {
        let layout = plain(|l| {
            let pair = |height| stiffener(&RULES, "S275", height, 12.0, 100.0, mm(120.0));
            l.stiffeners = height
                .map(|height| faying::joints::Stiffener { full_depth: false, ..pair(height) })
                .into_iter()
                .collect();
        });
        asked(&layout, &case(Some(moment), Some(20.0), Some(0.0)), Opposite::None, &RULES).carries()
    };
    let (top, bottom) = (Some(393.0), Some(7.0));
    for moment in [5000.0, -5000.0] {
        assert_eq!(ends(None, moment), State::NotMet);
        let [tension, compression] = if moment > 0.0 { [top, bottom] } else { [bottom, top] };
        assert_eq!(ends(tension, moment), State::NotMet);
        assert_eq!(ends(compression, moment), State::Unproven);
    }
}
