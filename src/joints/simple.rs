//! Joints that carry shear or axial force and are no moment joints: each kind in a file of its own, in a frame of its own.

mod column_base;

pub use column_base::{Anchor, ColumnBase, Foundation, Spread};

use super::Kind;
use super::draft::Draft;
use super::scene::Scene;

/// A joint that is no moment joint, laid out: all that its assessment needs, nothing else.
#[derive(Clone, Debug)]
pub enum SimpleLayout {
    /// A column's base plate on concrete.
    ColumnBase(Box<ColumnBase>),
}

impl SimpleLayout {
    /// The detail in lines, always the same lines in the same order, for a difference between two submissions.
    pub fn lines(&self) -> Vec<String> {
        match self {
            Self::ColumnBase(base) => base.lines(),
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
        Kind::ColumnBase => {
            column_base::lay_out(scene, draft).map(|laid| laid.map(|base| SimpleLayout::ColumnBase(Box::new(base))))
        }
        Kind::FinPlate
        | Kind::FlexibleEndPlate
        | Kind::WebCleats
        | Kind::CoverPlateSplice
        | Kind::Gusset
        | Kind::EndPlateMoment
        | Kind::EndPlateSplice
        | Kind::EndPlateToWeb
        | Kind::OtherBolted => None,
    }
}
