//! What the end plate hangs on.

use super::super::component;
use super::{Numbers, TEARS};
use crate::assess::Component;
use crate::eurocode::{Resistance, flexible};
use crate::joints::HeldBy;
use crate::units::{Force, Length};
use crate::{given, step};

impl Numbers<'_> {
    /// Thickness of the ply behind the plate.
    pub(super) fn t_2(&self) -> Length {
        if self.layout.held == HeldBy::ColumnFlange { self.support.t_f } else { self.support.t_w }
    }

    /// Bearing in the ply behind, and a web's shear along the lines of bolts.
    pub(super) fn support(&self) -> Vec<Component> {
        let layout = self.layout;
        let rows = &layout.bolts.rows;
        // A flange closes the web of a beam that lies across: no end for the bolts to tear out of.
        let ends = match layout.held {
            HeldBy::BeamWeb => [None, None],
            HeldBy::ColumnFlange | HeldBy::ColumnWeb => [Some(layout.above), Some(layout.below)],
        };
        let bearing = self.bearing(self.t_2(), self.support_steel.f_u, ends, |i| rows[i].edge_column);
        if layout.held == HeldBy::ColumnFlange {
            let title = "column flange in bearing";
            return vec![component("column-flange-in-bearing", title, "EN 1993-1-8:2005 3.6.1", bearing)];
        }
        let title = format!("{} in bearing", layout.held.word());
        let bearing = self.less_other_side(bearing);
        let local = self.less_other_side(self.local_shear());
        vec![
            component("supporting-web-in-bearing", &title, "EN 1993-1-8:2005 3.6.1", bearing),
            component(
                "supporting-web-in-shear",
                &format!("{} in shear beside the bolts", layout.held.word()),
                "EN 1993-1-1 6.2.6",
                local,
            ),
        ]
    }

    fn local_shear(&self) -> Resistance {
        let (layout, annex) = (self.layout, &self.rulebook.annex);
        let rows = &layout.bolts.rows;
        let (t_2, d, d_0) = (self.t_2(), self.bolts.d, self.bolts.d_0);
        let p = rows.first().zip(rows.last()).map_or(Length::ZERO, |(first, last)| first.height - last.height);
        let e_t = layout.above.min(TEARS * d);
        let e_b = layout.below.min(TEARS * d).min(0.5 * self.gauge());
        let A_v = (e_t + p + e_b) * t_2;
        let A_v_net = A_v - rows.len() as f64 * d_0 * t_2;
        let steel = &self.support_steel;
        flexible::supporting_web((A_v, A_v_net), (steel.f_y_web, steel.f_u), (annex.gamma_m0, annex.gamma_m2))
    }

    /// What another end plate on the same bolts leaves: it brings at most the shear resistance of those bolts.
    fn less_other_side(&self, all: Resistance) -> Resistance {
        let shared = self.layout.shared.iter().filter(|shared| **shared).count();
        if shared == 0 {
            return all;
        }
        let (V_both_Rd, mut w) = (all.value, all.working);
        let (n_shared, F_v_Rd) = (2.0 * shared as f64, self.F_v_Rd);
        given!(w, "for both sides of the web; bolts of both"; V_both_Rd, n_shared, F_v_Rd);
        step!(w, "the most that the other side brings", V_other = n_shared * F_v_Rd);
        step!(w, "what it leaves", V_left_Rd = (V_both_Rd - V_other).max(Force::ZERO));
        Resistance { value: V_left_Rd, working: w }
    }
}
