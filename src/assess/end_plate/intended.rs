//! The intended detail as a layout: what the schedule states, on the joint as detailed for everything it does not state.

use crate::intent::{IntendedDetail, IntendedStiffener};
use crate::joints::{BoltRow, EndPlateLayout, MemberAt, Stiffener};
use crate::origin::{Ask, Datum, Known, Missing, Origin};
use crate::rulebook::{Grade, Rulebook};
use crate::units::Length;

/// Lays the intended detail over the joint as detailed.
///
/// # Errors
/// [`Missing`] where the schedule names a section, grade or stiffener that can't be resolved.
pub fn intended(
    layout: &EndPlateLayout,
    detail: &IntendedDetail,
    rulebook: &Rulebook,
) -> Result<EndPlateLayout, Missing> {
    let by = |what: &str| Origin::Modelled { by: format!("{what} of detail {}", detail.name), at: detail.at.clone() };
    let grade = |what: &str, text: &str| -> Result<Known<Grade>, Missing> {
        match rulebook.grade(text) {
            Some(grade) => Ok(Ok(Datum::new(grade, by(what)))),
            None => Err(missing(what, format!("'{text}' is no grade of the steel table"), detail)),
        }
    };
    let mut meant = layout.clone();
    let member = |at: &mut MemberAt, section: &Option<String>, text: &Option<String>| -> Result<(), Missing> {
        if let Some(name) = section {
            let found = rulebook
                .section(name)
                .ok_or_else(|| missing("intended section", format!("'{name}' is in no section table"), detail))?;
            at.section = Ok(Datum::new(found.clone(), by("section")));
        }
        if let Some(text) = text {
            at.grade = grade("intended grade", text)?;
        }
        Ok(())
    };
    member(&mut meant.column, &detail.supporting_section, &detail.supporting_grade)?;
    member(&mut meant.beam, &detail.supported_section, &detail.supported_grade)?;

    let plate = &mut meant.plate;
    plate.thickness = detail.plate_thickness.unwrap_or(plate.thickness);
    plate.width = detail.plate_width.unwrap_or(plate.width);
    plate.top = detail.plate_top.unwrap_or(plate.top);
    plate.bottom = detail.plate_bottom.unwrap_or(plate.bottom);
    if let Some(text) = &detail.plate_grade {
        plate.grade = grade("intended plate grade", text)?;
    }

    if let Some(d) = detail.bolt_diameter {
        meant.bolts.diameter = Ok(Datum::new(d, by("bolt size")));
        let as_detailed = layout.bolts.diameter.as_ref().is_ok_and(|own| own.value == d);
        if !as_detailed {
            let size = rulebook
                .bolt_size(d)
                .ok_or_else(|| missing("intended bolt size", format!("no table has a bolt of {d}"), detail))?;
            meant.bolts.hole = Ok(Datum::new(size.d_0, Origin::Assumed("normal round hole, EN 1090-2".into())));
        }
    }
    if let Some(class) = &detail.bolt_class {
        meant.bolts.class = Ok(Datum::new(class.clone(), by("bolt class")));
    }
    rows(&mut meant, layout, detail);

    let weld = |own: &Known<Length>, throat: Option<Length>| match throat {
        Some(throat) => Ok(Datum::new(throat, by("weld throat"))),
        None => own.clone(),
    };
    meant.welds.flange_top = weld(&layout.welds.flange_top, detail.flange_weld);
    meant.welds.flange_bottom = weld(&layout.welds.flange_bottom, detail.flange_weld);
    meant.welds.web = weld(&layout.welds.web, detail.web_weld);

    if let (Ok(beam), Ok(column)) = (&meant.beam.section, &meant.column.section) {
        let (h, t_f) = (beam.value.h, beam.value.t_f);
        let free = 0.5 * (column.value.b - column.value.t_w);
        let reach = column.value.h - 2.0 * column.value.t_f;
        for (intended, height) in [(&detail.stiffener_top, h - 0.5 * t_f), (&detail.stiffener_bottom, 0.5 * t_f)] {
            let Some(intended) = intended else { continue };
            let level = |s: &Stiffener| (s.height - height).abs() <= t_f;
            let own = meant.stiffeners.iter().position(level).map(|i| meant.stiffeners.remove(i));
            if let Some(pair) = intended {
                meant.stiffeners.push(stiffener(
                    pair,
                    own,
                    height,
                    free,
                    reach,
                    &meant.column.grade,
                    detail,
                    rulebook,
                )?);
            }
        }
        meant.stiffeners.sort_by(|a, b| b.height.get().total_cmp(&a.height.get()));
    }
    Ok(meant)
}

/// Rows by intended heights and gauge; edge distances follow from the plate's and the flange's width.
fn rows(meant: &mut EndPlateLayout, layout: &EndPlateLayout, detail: &IntendedDetail) {
    let Some(first) = layout.bolts.rows.first() else { return };
    let heights: Vec<Length> =
        detail.rows.clone().unwrap_or_else(|| layout.bolts.rows.iter().map(|row| row.height).collect());
    let moved = heights.first().map_or(Length::ZERO, |top| *top - first.height);
    let lowered = match (heights.last(), layout.bolts.rows.last()) {
        (Some(lowest), Some(own)) => *lowest - own.height,
        _ => Length::ZERO,
    };
    let width = match &meant.column.section {
        Ok(section) => Some(section.value.b),
        Err(_) => None,
    };
    meant.bolts.rows = (heights.iter().enumerate())
        .map(|(i, &height)| {
            let own = layout.bolts.rows.get(i).unwrap_or(first);
            let gauge = detail.gauge.unwrap_or(own.gauge);
            let unchanged =
                detail.gauge.is_none() && detail.plate_width.is_none() && detail.supporting_section.is_none();
            BoltRow {
                height,
                gauge,
                edge_plate: if unchanged { own.edge_plate } else { 0.5 * (meant.plate.width - gauge) },
                edge_column: match width {
                    Some(b) if !unchanged => 0.5 * (b - gauge),
                    _ => own.edge_column,
                },
            }
        })
        .collect();
    meant.column_above = layout.column_above.map(|above| above - moved);
    meant.column_below = layout.column_below.map(|below| below + lowered);
}

#[allow(clippy::too_many_arguments)]
fn stiffener(
    pair: &IntendedStiffener,
    own: Option<Stiffener>,
    height: Length,
    free: Length,
    reach: Length,
    column_grade: &Known<Grade>,
    detail: &IntendedDetail,
    rulebook: &Rulebook,
) -> Result<Stiffener, Missing> {
    let by = Origin::Modelled { by: format!("stiffener of detail {}", detail.name), at: detail.at.clone() };
    let thickness = pair.thickness.or(own.as_ref().map(|s| s.thickness)).ok_or_else(|| {
        missing("intended stiffener thickness", "the detail asks for stiffeners and states no thickness".into(), detail)
    })?;
    let grade = match &pair.grade {
        Some(text) => match rulebook.grade(text) {
            Some(grade) => Ok(Datum::new(grade, by)),
            None => {
                return Err(missing(
                    "intended stiffener grade",
                    format!("'{text}' is no grade of the steel table"),
                    detail,
                ));
            }
        },
        None => own.as_ref().map_or_else(|| column_grade.clone(), |s| s.grade.clone()),
    };
    Ok(Stiffener {
        guids: own.as_ref().map(|s| s.guids.clone()).unwrap_or_default(),
        height,
        thickness,
        outstand: own.as_ref().filter(|s| s.both_sides).map_or(free, |s| s.outstand),
        reach,
        both_sides: true,
        full_depth: true,
        grade,
        weld: own.map_or_else(|| Err(missing("stiffener weld", "the detail states none".into(), detail)), |s| s.weld),
    })
}

fn missing(what: &str, reason: String, detail: &IntendedDetail) -> Missing {
    Missing {
        what: what.into(),
        reason: format!("{reason} (detail {})", detail.name),
        at: detail.at.clone(),
        ask: Ask::Engineer,
    }
}
