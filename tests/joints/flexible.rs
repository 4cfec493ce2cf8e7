//! Flexible end plates in their own frame. Expected values are the parameters with which the steel was built.

use faying::joints::{FlexibleEndPlate, HeldBy, Joint, SimpleLayout};
use faying::shop::{Notch, Steelwork};
use glam::DVec3;

use super::build::{BEAM, COLUMN, Detail, frame, move_all, moved};
use super::kinds::{on_both_sides, on_web};
use super::layouts::{close, find, only};

fn short() -> Detail {
    Detail { bottom: 90.0, top: 340.0, rows: vec![300.0, 215.0, 130.0], ..Detail::default() }
}

fn laid(joint: &Joint) -> &FlexibleEndPlate {
    match joint.layout.as_ref().expect("laid out").simple() {
        Some(SimpleLayout::FlexibleEndPlate(layout)) => layout,
        _ => panic!("{:?}", joint.layout),
    }
}

/// Welds of the web beside the plate only: the flange's do not touch it.
fn on_flange() -> Steelwork {
    frame(&[short()])
}

#[test]
fn on_a_columns_flange_with_its_weld_and_its_distances() {
    let joint = only(&on_flange());
    let layout = laid(&joint);
    assert_eq!((layout.held, layout.top, layout.bottom), (HeldBy::ColumnFlange, None, None));
    close(layout.plate.top.get() - layout.plate.bottom.get(), 250.0);
    close(layout.weld.as_ref().unwrap().value.get(), 4.0);
    // The column is 8 m high, the soffit at 4 m.
    close(layout.above.get(), 8000.0 - 4300.0);
    close(layout.below.get(), 4130.0);
    close(layout.bolts.rows[0].edge_column.get(), (COLUMN.2 - 90.0) / 2.0);
    assert_eq!(layout.shared, [false; 3]);
}

#[test]
fn on_a_columns_web_the_flanges_are_the_edges() {
    let layout_of = |steel: &Steelwork| laid(&only(steel)).clone();
    let layout = layout_of(&on_web(short()));
    assert_eq!(layout.held, HeldBy::ColumnWeb);
    close(layout.bolts.rows[0].edge_column.get(), (COLUMN.1 - 2.0 * COLUMN.4 - 90.0) / 2.0);
    let turned = layout_of(&moved(on_web(short()), 33.0, DVec3::new(7000.0, -300.0, 50.0)));
    assert_eq!(layout.lines(), turned.lines());
}

#[test]
fn on_both_sides_of_a_web_the_bolts_are_shared() {
    let joints = find(&on_both_sides(&short())).joints;
    assert_eq!(joints.len(), 2);
    for joint in &joints {
        assert_eq!(laid(joint).shared, [true; 3]);
    }
}

#[test]
fn a_notch_belongs_to_the_end_at_which_it_is() {
    let mut steel = on_flange();
    let notch = |at_end, positive| Notch { at_end, positive, length: 90.0, depth: 50.0, untaken: "cut".into() };
    steel.members[1].notches = vec![notch(false, true), notch(true, false)];
    let joint = only(&steel);
    let layout = laid(&joint);
    let top = layout.top.expect("a notch");
    close(top.length.get(), 90.0);
    close(top.depth.get(), 50.0);
    assert_eq!(layout.bottom, None);
    // Beside the web as left by it: the plate ends below the notch.
    close(
        layout
            .beside_web(
                layout.beam.section.as_ref().unwrap().value.h,
                faying::units::mm(BEAM.4),
                faying::units::mm(0.0),
            )
            .get(),
        250.0,
    );
}

#[test]
fn a_plate_off_its_support_is_refused() {
    let mut steel = on_flange();
    let column = steel.members[0].clone();
    move_all(&mut steel, |p| p + DVec3::X * 6.0, |d| d);
    steel.members[0] = column;
    // The bolts still reach the flange.
    let why = only(&steel).layout.expect_err("laid out");
    assert!(why.contains("stands off the column flange by 6.0 mm"), "{why}");
}
