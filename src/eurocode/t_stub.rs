//! The equivalent T-stub in tension: EN 1993-1-8:2005 6.2.4, Table 6.2.

use super::Resistance;
use crate::units::{Force, Length, Moment, Stress};
use crate::working::Working;
use crate::{given, step};

/// Which formula of Table 6.2 is used for mode 1.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum ModeOne {
    /// Method 1.
    Method1,
    /// Method 2, the bolt force spread under a washer (or head) of this diameter: e_w = d_w/4.
    Method2 {
        /// d_w.
        d_w: Length,
    },
}

/// An equivalent T-stub of one bolt row or a group.
#[derive(Clone, Copy, Debug)]
pub struct TStub {
    /// Σ l_eff,1.
    pub l_eff_1: Length,
    /// Σ l_eff,2.
    pub l_eff_2: Length,
    /// t_f: thickness of the plate in bending.
    pub t_f: Length,
    /// f_y of the plate in bending.
    pub f_y: Stress,
    /// m: from the bolt to 0.8 of the fillet.
    pub m: Length,
    /// n = e_min, at most 1.25 m.
    pub n: Length,
    /// Σ F_t,Rd of all bolts, punching allowed for.
    pub sum_F_t_Rd: Force,
    /// Method for mode 1.
    pub mode_one: ModeOne,
    /// Backing plates behind the flange (6.2.4.3): t_bp, their f_y and how much of Σ l_eff,1 they are long.
    pub backing: Option<BackingPlates>,
}

/// Backing plates of a column flange, which help in mode 1 only.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BackingPlates {
    /// t_bp.
    pub t_bp: Length,
    /// f_y of the plates.
    pub f_y_bp: Stress,
    /// Their length along the rows.
    pub h_bp: Length,
}

/// The resistance of a T-stub and the mode that gives it.
#[derive(Clone, Debug)]
pub struct TStubResistance {
    /// The smallest of the modes, with its working.
    pub resistance: Resistance,
    /// 1: the flange yields; 2: bolts fail with the flange yielding; 3: bolts fail.
    pub mode: u8,
}

/// Resistance of a T-stub, prying assumed to develop (Table 6.2, note: "may be assumed" in beam-to-column joints and
/// beam splices).
pub fn t_stub(stub: &TStub, gamma_M0: f64) -> TStubResistance {
    let mut w = Working::default();
    let TStub { l_eff_1, l_eff_2, t_f, f_y, m, n, sum_F_t_Rd, mode_one, backing } = *stub;
    given!(w, "T-stub"; l_eff_1, l_eff_2, t_f, f_y, m, n, sum_F_t_Rd);
    step!(w, "Table 6.2", M_pl_1_Rd = 0.25 * l_eff_1 * (t_f * t_f) * f_y / gamma_M0);
    step!(w, "Table 6.2", M_pl_2_Rd = 0.25 * l_eff_2 * (t_f * t_f) * f_y / gamma_M0);
    let mut M_bp = Moment::ZERO;
    if let Some(BackingPlates { t_bp, f_y_bp, h_bp }) = backing {
        given!(w, "backing plates"; t_bp, f_y_bp, h_bp);
        step!(w, "Table 6.2, 6.2.4.3", M_bp_Rd = 0.25 * l_eff_1.min(h_bp) * (t_bp * t_bp) * f_y_bp / gamma_M0);
        M_bp = M_bp_Rd;
    }
    let F_1 = match mode_one {
        ModeOne::Method1 if backing.is_some() => {
            let M_bp_Rd = M_bp;
            step!(w, "Table 6.2, method 1", F_T_1_Rd = (4.0 * M_pl_1_Rd + 2.0 * M_bp_Rd) / m);
            F_T_1_Rd
        }
        ModeOne::Method2 { d_w } if backing.is_some() => {
            let M_bp_Rd = M_bp;
            step!(w, "Table 6.2, method 2", e_w = d_w / 4.0);
            step!(
                w,
                "Table 6.2, method 2",
                F_T_1_Rd = M_pl_1_Rd / ((2.0 * m * n - e_w * (m + n)) / (8.0 * n - 2.0 * e_w))
                    + M_bp_Rd / ((2.0 * m * n - e_w * (m + n)) / (4.0 * n))
            );
            F_T_1_Rd
        }
        ModeOne::Method1 => {
            step!(w, "Table 6.2, method 1", F_T_1_Rd = 4.0 * M_pl_1_Rd / m);
            F_T_1_Rd
        }
        ModeOne::Method2 { d_w } => {
            step!(w, "Table 6.2, method 2", e_w = d_w / 4.0);
            step!(
                w,
                "Table 6.2, method 2",
                F_T_1_Rd = M_pl_1_Rd / ((2.0 * m * n - e_w * (m + n)) / (8.0 * n - 2.0 * e_w))
            );
            F_T_1_Rd
        }
    };
    step!(w, "Table 6.2", F_T_2_Rd = (2.0 * M_pl_2_Rd + n * sum_F_t_Rd) / (m + n));
    step!(w, "Table 6.2", F_T_3_Rd = sum_F_t_Rd);
    let value = F_1.min(F_T_2_Rd).min(F_T_3_Rd);
    let mode = if value == F_1 {
        1
    } else if value == F_T_2_Rd {
        2
    } else {
        3
    };
    TStubResistance { resistance: Resistance { value, working: w }, mode }
}
