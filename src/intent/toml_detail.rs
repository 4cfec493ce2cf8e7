//! An intended detail as TOML.

use std::borrow::Cow;

use toml::Spanned;
use toml::de::DeValue;

use super::actions::decimal;
use super::source::tidy;
use super::toml_form::{Reader, Sign, Table};
use super::{DiagonalForm, Friction, IntendedDetail, IntendedHaunch, IntendedStiffener};
use crate::rulebook::Category;
use crate::units::{Length, mm};

impl Reader<'_> {
    /// One `[detail.NAME]`.
    pub fn detail(&mut self, name: &Spanned<Cow<'_, str>>, value: &Spanned<DeValue<'_>>) -> Option<IntendedDetail> {
        let DeValue::Table(table) = value.get_ref() else {
            self.wrong(value, name.get_ref(), "a table [detail.NAME]");
            return None;
        };
        let table = Table { table, span: value.span(), name: format!("[detail.{}]", name.get_ref()) };
        self.known(&table, &["bolts", "plate", "welds", "stiffeners", "haunch", "members", "exposed", "base"]);
        let mut detail = IntendedDetail { at: Some(self.source.place(name.span().start)), ..IntendedDetail::default() };
        match tidy(name.get_ref()) {
            Ok(name) if !name.is_empty() => detail.name = name,
            Ok(_) => self.fault(name.span(), "a detail has no name; allowed is [detail.NAME]".into()),
            Err(message) => self.fault(name.span(), format!("detail: {message}")),
        }
        detail.exposed = self.truth(&table, "exposed");
        if let Some(bolts) = self.inner(&table, "bolts") {
            self.known(&bolts, &["size", "class", "rows_mm", "gauge_mm", "category", "friction_class", "slip_factor"]);
            detail.bolt_diameter = self.bolt_size(&bolts);
            detail.bolt_class = self.text(&bolts, "class");
            (detail.bolt_category, detail.friction) = self.category(&bolts);
            detail.rows = self.rows(&bolts);
            detail.gauge = self.length(&bolts, "gauge_mm", Sign::Positive);
        }
        if let Some(plate) = self.inner(&table, "plate") {
            self.known(&plate, &["thickness_mm", "width_mm", "top_mm", "bottom_mm", "grade"]);
            detail.plate_thickness = self.length(&plate, "thickness_mm", Sign::Positive);
            detail.plate_width = self.length(&plate, "width_mm", Sign::Positive);
            detail.plate_top = self.length(&plate, "top_mm", Sign::Any);
            detail.plate_bottom = self.length(&plate, "bottom_mm", Sign::Any);
            detail.plate_grade = self.text(&plate, "grade");
            let edges = detail.plate_top.zip(detail.plate_bottom);
            if let Some((top, bottom)) = edges.filter(|(top, bottom)| top <= bottom) {
                let message = format!("plate: top_mm {top} is not above bottom_mm {bottom}; allowed is a higher top");
                self.fault(plate.span, message);
            }
        }
        if let Some(welds) = self.inner(&table, "welds") {
            self.known(&welds, &["flange_throat_mm", "web_throat_mm"]);
            detail.flange_weld = self.length(&welds, "flange_throat_mm", Sign::Positive);
            detail.web_weld = self.length(&welds, "web_throat_mm", Sign::Positive);
        }
        if let Some(stiffeners) = self.inner(&table, "stiffeners") {
            self.known(&stiffeners, &["top", "bottom", "web_plates", "diagonals", "backing_plates"]);
            const PAIR: [&str; 4] = ["thickness_mm", "grade", "throat_mm", "length_mm"];
            detail.stiffener_top = self.plates(&stiffeners, "top", &PAIR);
            detail.stiffener_bottom = self.plates(&stiffeners, "bottom", &PAIR);
            detail.web_plates =
                self.plates(&stiffeners, "web_plates", &["thickness_mm", "grade", "throat_mm", "sides"]);
            detail.diagonals = self.plates(&stiffeners, "diagonals", &["thickness_mm", "grade", "throat_mm", "form"]);
            detail.backing_plates = self.plates(&stiffeners, "backing_plates", &["thickness_mm", "grade"]);
            if let Some(Some(_)) = detail.web_plates {
                let table = self.inner(&stiffeners, "web_plates");
                detail.web_plate_sides = table.and_then(|table| self.sides(&table));
            }
            if let Some(Some(_)) = detail.diagonals {
                let table = self.inner(&stiffeners, "diagonals");
                detail.diagonal_form = table.and_then(|table| self.form(&table));
            }
        }
        detail.haunch = self.haunch(&table);
        detail.base = self.base(&table);
        if let Some(members) = self.inner(&table, "members") {
            self.known(&members, &["supporting_section", "supported_section", "supporting_grade", "supported_grade"]);
            detail.supporting_section = self.text(&members, "supporting_section");
            detail.supported_section = self.text(&members, "supported_section");
            detail.supporting_grade = self.text(&members, "supporting_grade");
            detail.supported_grade = self.text(&members, "supported_grade");
        }
        Some(detail)
    }

    fn bolt_size(&mut self, bolts: &Table<'_>) -> Option<Length> {
        let value = bolts.table.get("size")?;
        let size = value.get_ref().as_str().and_then(|text| text.trim().strip_prefix(['M', 'm']));
        let diameter = size.and_then(|size| decimal(size.trim(), false)).filter(|d| *d > 0.0 && *d <= 200.0);
        if diameter.is_none() {
            self.wrong(value, "size", "M and the nominal diameter in mm, such as \"M24\"");
        }
        diameter.map(mm)
    }

    /// The category, and the friction surfaces: their class or their slip factor.
    fn category(&mut self, bolts: &Table<'_>) -> (Option<Category>, Option<Friction>) {
        let category = self.text(bolts, "category").and_then(|text| {
            let category = Category::named(&text);
            if let (None, Some(value)) = (category, bolts.table.get("category")) {
                self.wrong(value, "category", "A, B, C, D or E of EN 1993-1-8 Table 3.2");
            }
            category
        });
        let class = self.text(bolts, "friction_class").and_then(|class| {
            let class = class.to_uppercase();
            if !matches!(class.as_str(), "A" | "B" | "C" | "D")
                && let Some(value) = bolts.table.get("friction_class")
            {
                self.wrong(value, "friction_class", "A, B, C or D of EN 1993-1-8 Table 3.7");
                return None;
            }
            Some(Friction::Class(class))
        });
        let Some(value) = bolts.table.get("slip_factor") else { return (category, class) };
        let factor = self.number(value, "slip_factor", 1.0, Sign::Positive).filter(|mu| *mu <= 1.0);
        if factor.is_none() || class.is_some() {
            self.wrong(value, "slip_factor", "a number above 0 up to 1, without a friction_class beside it");
        }
        (category, factor.map(Friction::Factor).or(class))
    }

    fn rows(&mut self, bolts: &Table<'_>) -> Option<Vec<Length>> {
        let value = bolts.table.get("rows_mm")?;
        let allowed = "a list of heights above the soffit in mm, from the top row down";
        let Some(items) = value.get_ref().as_array().filter(|items| !items.is_empty()) else {
            self.wrong(value, "rows_mm", allowed);
            return None;
        };
        let mut rows = Vec::new();
        for item in items.iter() {
            rows.push(mm(self.number(item, "rows_mm", 1.0, Sign::Any)?));
        }
        // Rows measured from the plate's top edge would rise: they are not put in order, but given back.
        if !rows.iter().zip(rows.iter().skip(1)).all(|(upper, lower)| upper > lower) {
            self.wrong(value, "rows_mm", allowed);
            return None;
        }
        Some(rows)
    }

    fn haunch(&mut self, detail: &Table<'_>) -> Option<Option<IntendedHaunch>> {
        let value = detail.table.get("haunch")?;
        match value.get_ref() {
            DeValue::String(text) if text == "none" => Some(None),
            DeValue::Table(_) => {
                let table = self.inner(detail, "haunch")?;
                let keys = ["depth_mm", "length_mm", "flange_thickness_mm", "flange_width_mm", "web_thickness_mm"];
                self.known(&table, &keys);
                let [depth, length, flange_thickness, flange_width, web_thickness] =
                    keys.map(|key| self.length(&table, key, Sign::Positive));
                Some(Some(IntendedHaunch { depth, length, flange_thickness, flange_width, web_thickness }))
            }
            _ => {
                self.wrong(value, "haunch", "\"none\" or a table such as { depth_mm = 300, length_mm = 700 }");
                None
            }
        }
    }

    fn plates(&mut self, stiffeners: &Table<'_>, key: &str, keys: &[&str]) -> Option<Option<IntendedStiffener>> {
        let value = stiffeners.table.get(key)?;
        match value.get_ref() {
            DeValue::String(text) if text == "none" => Some(None),
            DeValue::Table(_) => {
                let table = self.inner(stiffeners, key)?;
                self.known(&table, keys);
                let thickness = self.length(&table, "thickness_mm", Sign::Positive);
                let throat = self.length(&table, "throat_mm", Sign::Positive);
                let length = self.length(&table, "length_mm", Sign::Positive);
                Some(Some(IntendedStiffener { thickness, grade: self.text(&table, "grade"), throat, length }))
            }
            _ => {
                self.wrong(value, key, "\"none\" or a table such as { thickness_mm = 15, grade = \"S275\" }");
                None
            }
        }
    }

    fn sides(&mut self, plates: &Table<'_>) -> Option<u8> {
        let value = plates.table.get("sides")?;
        let count = value.get_ref().as_integer().and_then(|count| count.as_str().parse().ok());
        let sides = count.filter(|count| matches!(count, 1..=2));
        if sides.is_none() {
            self.wrong(value, "sides", "1 or 2 sides of the column's web");
        }
        sides
    }

    fn form(&mut self, diagonals: &Table<'_>) -> Option<DiagonalForm> {
        let value = diagonals.table.get("form")?;
        let form = match value.get_ref().as_str() {
            Some("N") => Some(DiagonalForm::N),
            Some("K") => Some(DiagonalForm::K),
            _ => None,
        };
        if form.is_none() {
            self.wrong(value, "form", "\"N\" or \"K\"");
        }
        form
    }
}
