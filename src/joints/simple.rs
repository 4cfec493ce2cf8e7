//! Joints that carry shear or axial force and are no moment joints: each kind in a file of its own, in a frame of its own.

mod flexible;

pub use flexible::{Cope, FlexibleEndPlate, Held as HeldBy};

use super::Kind;
use super::draft::Draft;
use super::scene::Scene;

/// A joint that is no moment joint, laid out: all that its assessment needs, nothing else.
#[derive(Clone, Debug)]
pub enum SimpleLayout {
    /// A flexible end plate.
    FlexibleEndPlate(Box<FlexibleEndPlate>),
}

impl SimpleLayout {
    /// The detail in lines, always the same lines in the same order, for a difference between two submissions.
    pub fn lines(&self) -> Vec<String> {
        match self {
            Self::FlexibleEndPlate(layout) => layout.lines(),
        }
    }

    /// Whether the assessment takes notches at the supported member's end into account.
    pub fn takes_notches(&self) -> bool {
        match self {
            Self::FlexibleEndPlate(_) => true,
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
        Kind::FlexibleEndPlate => {
            Some(flexible::lay_out(scene, draft).map(|layout| SimpleLayout::FlexibleEndPlate(Box::new(layout))))
        }
        Kind::FinPlate
        | Kind::WebCleats
        | Kind::CoverPlateSplice
        | Kind::ColumnBase
        | Kind::Gusset
        | Kind::EndPlateMoment
        | Kind::EndPlateSplice
        | Kind::EndPlateToWeb
        | Kind::OtherBolted => None,
    }
}
