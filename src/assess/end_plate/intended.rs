//! The intended detail as a layout: what the schedule states, on the joint as detailed for everything it does not state.

mod column;

use crate::intent::{Friction, IntendedDetail};
use crate::joints::{BoltRow, Bolts, EndPlate, EndPlateLayout, Haunch, Held, Layout, MemberAt, SpliceLayout, Welds};
use crate::origin::{Ask, Datum, Known, Missing, Origin};
use crate::rulebook::{Grade, Rulebook};
use crate::units::Length;

/// Lays the intended detail over a joint of any kind as detailed.
///
/// # Errors
/// [`Missing`] where the schedule names a section, grade or stiffener that can't be resolved.
pub fn intended_layout(layout: &Layout, detail: &IntendedDetail, rulebook: &Rulebook) -> Result<Layout, Missing> {
    match layout {
        Layout::EndPlate(layout) => intended(layout, detail, rulebook).map(Layout::EndPlate),
        Layout::Splice(layout) => splice(layout, detail, rulebook).map(Layout::Splice),
    }
}

/// The joint as detailed with what the schedule asks of its bolts and no model shows: their category and friction
/// surfaces. `None` where the detail states neither.
pub fn with_category(layout: &Layout, detail: &IntendedDetail, rulebook: &Rulebook) -> Option<Layout> {
    if detail.bolt_category.is_none() && detail.friction.is_none() {
        return None;
    }
    let mut asked = layout.clone();
    let held = match &mut asked {
        Layout::EndPlate(layout) => &mut layout.bolts.held,
        Layout::Splice(layout) => &mut layout.bolts.held,
    };
    Stated { detail, rulebook }.category(held);
    Some(asked)
}

/// The same for an end-plate splice: what is stated of plate and welds is meant for both halves.
fn splice(layout: &SpliceLayout, detail: &IntendedDetail, rulebook: &Rulebook) -> Result<SpliceLayout, Missing> {
    let stated = Stated { detail, rulebook };
    let mut meant = layout.clone();
    stated.member(&mut meant.supporting.beam, &detail.supporting_section, &detail.supporting_grade)?;
    stated.member(&mut meant.supported.beam, &detail.supported_section, &detail.supported_grade)?;
    for half in [&mut meant.supported, &mut meant.supporting] {
        stated.plate(&mut half.plate)?;
        stated.welds(&mut half.welds);
    }
    stated.bolts(&mut meant.bolts)?;
    let width = meant.supporting.plate.width;
    stated.rows(&mut meant.bolts, meant.supported.plate.width, detail.plate_width.is_some(), Some(width));
    Ok(meant)
}

/// Lays the intended detail over an end-plate joint as detailed.
///
/// # Errors
/// [`Missing`] where the schedule names a section, grade or stiffener that can't be resolved.
pub fn intended(
    layout: &EndPlateLayout,
    detail: &IntendedDetail,
    rulebook: &Rulebook,
) -> Result<EndPlateLayout, Missing> {
    let stated = Stated { detail, rulebook };
    let mut meant = layout.clone();
    stated.member(&mut meant.column, &detail.supporting_section, &detail.supporting_grade)?;
    stated.member(&mut meant.beam, &detail.supported_section, &detail.supported_grade)?;
    stated.plate(&mut meant.plate)?;
    stated.bolts(&mut meant.bolts)?;
    let width = meant.column.section.as_ref().ok().map(|section| section.value.b);
    stated.rows(&mut meant.bolts, meant.plate.width, detail.supporting_section.is_some(), width);
    let (own, rows) = (&layout.bolts.rows, &meant.bolts.rows);
    let moved = |a: Option<&BoltRow>, b: Option<&BoltRow>| match (a, b) {
        (Some(own), Some(meant)) => meant.height - own.height,
        _ => Length::ZERO,
    };
    let (up, down) = (moved(own.first(), rows.first()), moved(own.last(), rows.last()));
    meant.column_above = layout.column_above.map(|above| above - up);
    meant.column_below = layout.column_below.map(|below| below + down);
    stated.welds(&mut meant.welds);
    stated.haunch(&mut meant.haunch)?;

    stated.strengthening(&mut meant)?;
    Ok(meant)
}

/// What the detail states, laid over the parts one by one.
struct Stated<'a> {
    detail: &'a IntendedDetail,
    rulebook: &'a Rulebook,
}

impl Stated<'_> {
    fn by(&self, what: &str) -> Origin {
        Origin::Modelled { by: format!("{what} of detail {}", self.detail.name), at: self.detail.at.clone() }
    }

    fn grade(&self, what: &str, text: &str) -> Result<Known<Grade>, Missing> {
        match self.rulebook.grade(text) {
            Some(grade) => Ok(Ok(Datum::new(grade, self.by(what)))),
            None => Err(missing(what, format!("'{text}' is no grade of the steel table"), self.detail)),
        }
    }

    fn member(&self, at: &mut MemberAt, section: &Option<String>, grade: &Option<String>) -> Result<(), Missing> {
        if let Some(name) = section {
            let found = self
                .rulebook
                .section(name)
                .ok_or_else(|| missing("intended section", format!("'{name}' is in no section table"), self.detail))?;
            at.section = Ok(Datum::new(found.clone(), self.by("section")));
        }
        if let Some(text) = grade {
            at.grade = self.grade("intended grade", text)?;
        }
        Ok(())
    }

    fn plate(&self, plate: &mut EndPlate) -> Result<(), Missing> {
        let detail = self.detail;
        plate.thickness = detail.plate_thickness.unwrap_or(plate.thickness);
        plate.width = detail.plate_width.unwrap_or(plate.width);
        plate.top = detail.plate_top.unwrap_or(plate.top);
        plate.bottom = detail.plate_bottom.unwrap_or(plate.bottom);
        if let Some(text) = &detail.plate_grade {
            plate.grade = self.grade("intended plate grade", text)?;
        }
        Ok(())
    }

    fn bolts(&self, bolts: &mut Bolts) -> Result<(), Missing> {
        if let Some(d) = self.detail.bolt_diameter {
            let as_detailed = bolts.diameter.as_ref().is_ok_and(|own| own.value == d);
            bolts.diameter = Ok(Datum::new(d, self.by("bolt size")));
            if !as_detailed {
                let size = self
                    .rulebook
                    .bolt_size(d)
                    .ok_or_else(|| missing("intended bolt size", format!("no table has a bolt of {d}"), self.detail))?;
                bolts.hole = Ok(Datum::new(size.d_0, Origin::Assumed("normal round hole, EN 1090-2".into())));
            }
        }
        if let Some(class) = &self.detail.bolt_class {
            bolts.class = Ok(Datum::new(class.clone(), self.by("bolt class")));
        }
        self.category(&mut bolts.held);
        Ok(())
    }

    fn category(&self, held: &mut Held) {
        if let Some(category) = self.detail.bolt_category {
            held.category = Some(Datum::new(category, self.by("category")));
        }
        let stated = match &self.detail.friction {
            Some(Friction::Class(class)) => {
                let mu = self.rulebook.slip.friction.get(class);
                mu.map(|mu| (*mu, format!("friction class {class} (Table 3.7)")))
            }
            Some(Friction::Factor(mu)) => Some((*mu, "slip factor".into())),
            None => None,
        };
        if let Some((mu, what)) = stated {
            held.slip_factor = Some(Datum::new(mu, self.by(&what)));
        }
    }

    /// What is stated over the haunch as detailed.
    fn haunch(&self, haunch: &mut Option<Haunch>) -> Result<(), Missing> {
        let Some(stated) = &self.detail.haunch else { return Ok(()) };
        let Some(stated) = stated else {
            *haunch = None;
            return Ok(());
        };
        let Some(own) = haunch else {
            let why = "a haunch is intended where none is detailed: what it would carry is not computed";
            return Err(missing("intended haunch", why.into(), self.detail));
        };
        let angle = own.angle;
        let changed = stated.depth.is_some() || stated.length.is_some();
        for (value, stated) in [
            (&mut own.depth, stated.depth),
            (&mut own.length, stated.length),
            (&mut own.flange_thickness, stated.flange_thickness),
            (&mut own.flange_width, stated.flange_width),
            (&mut own.web_thickness, stated.web_thickness),
        ] {
            *value = stated.unwrap_or(*value);
        }
        own.angle = if changed { (own.depth / own.length).atan().to_degrees() } else { angle };
        Ok(())
    }

    fn welds(&self, welds: &mut Welds) {
        let by = || self.by("weld throat");
        let lay = |own: &mut Known<Length>, throat: Option<Length>| {
            if let Some(throat) = throat {
                *own = Ok(Datum::new(throat, by()));
            }
        };
        lay(&mut welds.flange_top, self.detail.flange_weld);
        lay(&mut welds.flange_bottom, self.detail.flange_weld);
        lay(&mut welds.web, self.detail.web_weld);
        // A stated throat means a fillet.
        let fillets = self.detail.flange_weld.is_some();
        welds.full.flange_top &= !fillets;
        welds.full.flange_bottom &= !fillets;
        welds.full.web &= self.detail.web_weld.is_none();
    }

    /// Rows by intended heights and gauge; edge distances follow from the plate's width and that of what it is bolted to,
    /// where one of them or the gauge is stated.
    fn rows(&self, bolts: &mut Bolts, plate: Length, other_width_stated: bool, support: Option<Length>) {
        let Some(first) = bolts.rows.first().cloned() else { return };
        let detail = self.detail;
        let heights: Vec<Length> =
            detail.rows.clone().unwrap_or_else(|| bolts.rows.iter().map(|row| row.height).collect());
        let unchanged = detail.gauge.is_none() && detail.plate_width.is_none() && !other_width_stated;
        let rows = heights.iter().enumerate().map(|(i, &height)| {
            let own = bolts.rows.get(i).unwrap_or(&first);
            let gauge = detail.gauge.unwrap_or(own.gauge);
            BoltRow {
                height,
                gauge,
                edge_plate: if unchanged { own.edge_plate } else { 0.5 * (plate - gauge) },
                edge_column: match support {
                    Some(b) if !unchanged => 0.5 * (b - gauge),
                    _ => own.edge_column,
                },
            }
        });
        bolts.rows = rows.collect();
    }
}

fn missing(what: &str, reason: String, detail: &IntendedDetail) -> Missing {
    Missing {
        what: what.into(),
        reason: format!("{reason} (detail {})", detail.name),
        at: detail.at.clone(),
        ask: Ask::Engineer,
    }
}
