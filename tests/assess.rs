//! The strength of end-plate joints: laws on invented joints, a second way of computing, limits known from theory, and what
//! once slipped through.

mod axial;
mod butt_welds;
pub mod column_bases;
pub mod fin_plates;
pub mod flexible;
mod haunches;
mod intended;
pub mod joint;
mod known_limits;
mod laws;
mod needed_throat;
mod odd_sizes;
mod plastic;
mod safe;
mod slip;
mod splices;
mod stiffness;
pub mod strengthened;
mod strengthening;
