//! The springs of each tension row: Table 6.11, 6.3.3.1.
#![allow(non_snake_case)]

use super::TensionSide;
use crate::eurocode::stiffness;
use crate::units::Length;
use crate::working::Working;

impl TensionSide<'_> {
    /// k_eff,r of each tension row with its lever arm.
    pub fn springs(&self, w: &mut Working) -> Vec<(Length, Length)> {
        let bolts = &self.n.bolts;
        let clamped: Length = self
            .n
            .column()
            .map(|column| column.section.t_f)
            .into_iter()
            .chain(self.plates.iter().map(|plate| plate.side.which.count() as f64 * plate.side.t_p))
            .sum();
        // One under the head and one under the nut: fewer make the bolts stiffer.
        let washers = 2.0 * bolts.washer_thickness;
        let L_b = stiffness::bolt_length(w, clamped, washers, bolts.head, bolts.nut);
        let k_10 = stiffness::bolts(w, bolts.A_s, L_b);
        let mut springs = Vec::new();
        for (i, row) in self.rows.iter().enumerate() {
            w.heading(format!("row {}", row.number));
            let mut k = vec![k_10];
            if let Some(column) = self.n.column() {
                let section = &column.section;
                let d_c = section.h - 2.0 * (section.t_f + column.r);
                // A large radius brings the yield lines nearer and leaves less of the web.
                let b_eff = self.least_on_column(column, i, column.r_most);
                k.push(stiffness::web_in_tension(w, b_eff, section.t_w, d_c));
                let l_eff = self.least_on_column(column, i, column.r);
                k.push(stiffness::flange_in_bending(w, l_eff, section.t_f, self.m_column(column, row)));
            }
            for plate in &self.plates {
                let (l_eff, m) = self.least_on_plate(plate, i);
                let k_5 = stiffness::plate_in_bending(w, l_eff, plate.side.t_p, m);
                k.extend(std::iter::repeat_n(k_5, plate.side.which.count()));
            }
            crate::step!(w, "6.3.3.1, (6.30)", k_eff_r = stiffness::in_series(&k));
            springs.push((k_eff_r, self.n.lever_arm(row)));
        }
        springs
    }
}
