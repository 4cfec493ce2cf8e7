//! What a schedule states of the foundation below a column's base plate.

use std::ops::RangeInclusive;

use super::toml_form::{Reader, Sign, Table};
use crate::joints::{Foundation, Spread};
use crate::units::{Stress, mpa};

/// Strength classes of EN 1992-1-1 Table 3.1: f_ck by cylinder and by cube, N/mm².
const CLASSES: [(u8, u8); 14] = [
    (12, 15),
    (16, 20),
    (20, 25),
    (25, 30),
    (30, 37),
    (35, 45),
    (40, 50),
    (45, 55),
    (50, 60),
    (55, 67),
    (60, 75),
    (70, 85),
    (80, 95),
    (90, 105),
];

impl Reader<'_> {
    /// `base = { … }` of a detail.
    pub(super) fn base(&mut self, detail: &Table<'_>) -> Option<Foundation> {
        let table = self.inner(detail, "base")?;
        self.known(
            &table,
            &[
                "concrete",
                "gamma_c",
                "alpha_cc",
                "bed_mm",
                "bed_strength_MPa",
                "concentration",
                "foundation",
                "anchors_held",
            ],
        );
        Some(Foundation {
            concrete: self.concrete(&table),
            gamma_c: self.within(&table, "gamma_c", 1.0..=2.0),
            alpha_cc: self.within(&table, "alpha_cc", 0.8..=1.0),
            bed: self.length(&table, "bed_mm", Sign::Positive),
            bed_strength: self.within(&table, "bed_strength_MPa", 0.1..=200.0).map(mpa),
            spread: self.spread(&table),
            anchors_held: self.truth(&table, "anchors_held"),
        })
    }

    fn concrete(&mut self, table: &Table<'_>) -> Option<(String, Stress)> {
        let text = self.text(table, "concrete")?;
        let class = CLASSES.into_iter().map(|(f_ck, cube)| (format!("C{f_ck}/{cube}"), mpa(f64::from(f_ck))));
        let class = class.into_iter().find(|(name, _)| name.eq_ignore_ascii_case(&text.replace(' ', "")));
        if let (None, Some(value)) = (&class, table.table.get("concrete")) {
            self.wrong(value, "concrete", "a strength class of EN 1992-1-1 Table 3.1, such as \"C30/37\"");
        }
        class
    }

    fn within(&mut self, table: &Table<'_>, key: &str, range: RangeInclusive<f64>) -> Option<f64> {
        let value = table.table.get(key)?;
        let number = self.number(value, key, 1.0, Sign::Positive)?;
        if !range.contains(&number) {
            self.wrong(value, key, &format!("a number from {} to {}", range.start(), range.end()));
            return None;
        }
        Some(number)
    }

    fn spread(&mut self, table: &Table<'_>) -> Option<Spread> {
        let ratio = self.within(table, "concentration", 1.0..=3.0).map(Spread::Ratio);
        let Some(foundation) = self.inner(table, "foundation") else { return ratio };
        let keys = ["beyond_depth_mm", "beyond_width_mm", "depth_mm"];
        self.known(&foundation, &keys);
        let [e_h, e_b, depth] = keys.map(|key| self.length(&foundation, key, Sign::Positive));
        let (Some(e_h), Some(e_b), Some(depth), None) = (e_h, e_b, depth, &ratio) else {
            let allowed = format!("all of {}, without a concentration beside it", keys.join(", "));
            self.fault(foundation.span, format!("foundation: allowed is {allowed}"));
            return None;
        };
        Some(Spread::Foundation { e_h, e_b, depth })
    }
}
