//! Joints that carry shear or axial force and are no moment joints: each kind in a file of its own, in a frame of its own.

mod column_base;
mod fin_plate;
mod flexible;
mod grid;

pub use column_base::{Anchor, ColumnBase, Foundation, Spread};
pub use fin_plate::{FinPlate, On};
pub use flexible::{Cope, FlexibleEndPlate, Held as HeldBy};
pub use grid::Grid;

use super::Kind;
use super::draft::Draft;
use super::scene::Scene;

/// A joint that is no moment joint, laid out: all that its assessment needs, nothing else.
#[derive(Clone, Debug)]
pub enum SimpleLayout {
    /// A fin plate.
    FinPlate(Box<FinPlate>),
    /// A flexible end plate.
    FlexibleEndPlate(Box<FlexibleEndPlate>),
    /// A column's base plate on concrete.
    ColumnBase(Box<ColumnBase>),
}

impl SimpleLayout {
    /// The detail in lines, always the same lines in the same order, for a difference between two submissions.
    pub fn lines(&self) -> Vec<String> {
        match self {
            Self::FinPlate(layout) => layout.lines(),
            Self::FlexibleEndPlate(layout) => layout.lines(),
            Self::ColumnBase(base) => base.lines(),
        }
    }

    /// Whether the assessment takes notches at the supported member's end into account.
    pub fn takes_notches(&self) -> bool {
        match self {
            Self::FinPlate(_) | Self::FlexibleEndPlate(_) => true,
            Self::ColumnBase(_) => false,
        }
    }
}

/// Lays a recognised joint out by its kind.
///
/// # Errors
/// One sentence on the first thing that the assessment of the kind does not cover; that of kinds without an assessment is
/// the draft's own.
pub(super) fn lay_out(scene: &Scene, draft: &mut Draft) -> Option<Result<SimpleLayout, String>> {
    match draft.joint.kind {
        Kind::FinPlate => Some(fin_plate::lay_out(scene, draft).map(|layout| SimpleLayout::FinPlate(Box::new(layout)))),
        Kind::FlexibleEndPlate => {
            Some(flexible::lay_out(scene, draft).map(|layout| SimpleLayout::FlexibleEndPlate(Box::new(layout))))
        }
        Kind::ColumnBase => {
            column_base::lay_out(scene, draft).map(|laid| laid.map(|base| SimpleLayout::ColumnBase(Box::new(base))))
        }
        Kind::WebCleats
        | Kind::CoverPlateSplice
        | Kind::Gusset
        | Kind::EndPlateMoment
        | Kind::EndPlateSplice
        | Kind::EndPlateToWeb
        | Kind::OtherBolted => None,
    }
}
