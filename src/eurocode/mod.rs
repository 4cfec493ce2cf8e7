//! Formulas of EN 1993-1-8:2005 and what they call of EN 1993-1-1 and EN 1993-1-5: numbers with units in, numbers
//! with units and their working out. Nothing here knows IFC or joints, and nothing has a default.
//!
//! Symbols keep the standard's case, so the code can be held against the page.
#![allow(non_snake_case)]

pub mod alpha;
pub mod beam;
pub mod bolt_group;
pub mod bolts;
pub mod classification;
pub mod column_base;
pub mod column_web;
pub mod diagonals;
pub mod effective_length;
pub mod fin_plate;
pub mod flexible;
pub mod haunch;
pub mod net_section;
pub mod notched;
pub mod slip;
pub mod stiffeners;
pub mod stiffness;
pub mod t_stub;
pub mod web_panel;
pub mod web_plates;
pub mod welds;

use crate::units::Force;
use crate::working::Working;

/// Young's modulus of steel, EN 1993-1-1 3.2.6.
pub const E: crate::units::Stress = crate::units::mpa(210_000.0);

/// A resistance with its working.
#[derive(Clone, Debug)]
pub struct Resistance {
    /// The design resistance.
    pub value: Force,
    /// How it was computed.
    pub working: Working,
}

/// ε = √(235/f_y), EN 1993-1-1 Table 5.2.
pub fn epsilon(f_y: crate::units::Stress) -> f64 {
    (235.0 / f_y.get()).sqrt()
}
