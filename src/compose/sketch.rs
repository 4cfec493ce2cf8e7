//! The joint's geometry for drawings, from its layout.

use std::sync::Arc;

use crate::joints::{EndPlate, EndPlateLayout, Joint, Layout, MemberAt, Welds};
use crate::origin::Known;
use crate::review::sketch::{
    Against, BeamEnd, ColumnPart, FlatPlate, PlateFace, Profile, Sketch, SketchDiagonal, SketchRow, SketchStiffener,
};
use crate::shop::{Member, Steelwork};
use crate::units::Length;

/// The sketch of a joint; `None` if it could not be laid out.
pub fn sketch(steelwork: &Steelwork, joint: &Joint) -> Option<Arc<Sketch>> {
    let layout = joint.layout.as_ref().ok()?;
    let member = |index: Option<usize>| index.and_then(|i| steelwork.members.get(i));
    let supported = member(joint.supported);
    let end = |beam: &MemberAt, body: Option<&Member>, soffit: Length, plate: &EndPlate, welds: &Welds| {
        Some(BeamEnd {
            beam: profile(beam, body)?,
            soffit_mm: soffit.get(),
            plate: face(steelwork, joint, plate),
            throats_mm: [&welds.flange_top, &welds.web, &welds.flange_bottom]
                .map(|throat| throat.as_ref().ok().map(|a| a.value.get())),
        })
    };
    let (end, against) = match layout {
        Layout::EndPlate(layout) => (
            end(&layout.beam, supported, Length::ZERO, &layout.plate, &layout.welds)?,
            Against::Column(column(layout, member(joint.supporting))?),
        ),
        Layout::Splice(layout) => {
            let (own, other) = (&layout.supported, &layout.supporting);
            let other = end(&other.beam, member(joint.supporting), other.soffit, &other.plate, &other.welds)?;
            (end(&own.beam, supported, own.soffit, &own.plate, &own.welds)?, Against::Beam(other))
        }
    };
    let bolts = layout.bolts();
    Some(Arc::new(Sketch {
        end,
        against,
        bolts: format!(
            "{} {}",
            said(&bolts.diameter, |d| format!("M{:.0}", d.get()), "size not known"),
            said(&bolts.class, String::clone, "class not known"),
        ),
        bolt_mm: bolts.diameter.as_ref().ok().map(|d| d.value.get()),
        rows: (bolts.rows.iter())
            .map(|row| SketchRow {
                height_mm: row.height.get(),
                gauge_mm: row.gauge.get(),
                edge_plate_mm: row.edge_plate.get(),
                edge_other_mm: row.edge_column.get(),
            })
            .collect(),
    }))
}

fn said<T>(known: &Known<T>, print: impl Fn(&T) -> String, unknown: &str) -> String {
    known.as_ref().map_or_else(|_| unknown.to_owned(), |datum| print(&datum.value))
}

fn column(layout: &EndPlateLayout, body: Option<&Member>) -> Option<ColumnPart> {
    let rows = &layout.bolts.rows;
    let column = profile(&layout.column, body)?;
    let column_width = column.width_mm;
    Some(ColumnPart {
        column,
        top_mm: rows.first().zip(layout.column_above).map(|(row, above)| (row.height + above).get()),
        bottom_mm: rows.last().zip(layout.column_below).map(|(row, below)| (row.height - below).get()),
        stiffeners: (layout.stiffeners.iter())
            .map(|stiffener| SketchStiffener {
                height_mm: stiffener.height.get(),
                thickness_mm: stiffener.thickness.get(),
                reach_mm: stiffener.reach.get(),
                both_sides: stiffener.both_sides,
                full_depth: stiffener.full_depth,
            })
            .collect(),
        web_plates: (layout.strengthening.web_plates.iter())
            .map(|plate| FlatPlate {
                thickness_mm: plate.thickness.get(),
                width_mm: plate.width.get(),
                bottom_mm: plate.bottom.get(),
                top_mm: plate.top.get(),
            })
            .collect(),
        diagonals: (layout.strengthening.diagonals.iter())
            .map(|diagonal| SketchDiagonal {
                thickness_mm: diagonal.thickness.get(),
                near_mm: diagonal.near.get(),
                far_mm: diagonal.far.get(),
                both_sides: diagonal.both_sides,
            })
            .collect(),
        backing: (layout.strengthening.backing.iter())
            .map(|backing| FlatPlate {
                thickness_mm: backing.thickness.get(),
                width_mm: column_width - 2.0 * backing.short_of_edge.get(),
                bottom_mm: backing.bottom.get(),
                top_mm: backing.top.get(),
            })
            .collect(),
    })
}

/// Its section's sizes, else those of its body.
fn profile(at: &MemberAt, body: Option<&Member>) -> Option<Profile> {
    let label = [
        at.mark.clone().unwrap_or_else(|| "without mark".into()),
        said(&at.section, |s| s.designation.clone(), "section not known"),
        said(&at.grade, |g| g.0.clone(), "grade not known"),
    ];
    let (depth, width, web, flange) = match (&at.section, body) {
        (Ok(section), _) => {
            let s = &section.value;
            (s.h.get(), s.b.get(), Some(s.t_w.get()), Some(s.t_f.get()))
        }
        (Err(_), Some(body)) => (body.extents.y, body.extents.x, None, None),
        (Err(_), None) => return None,
    };
    Some(Profile { label: label.join(" "), depth_mm: depth, width_mm: width, web_mm: web, flange_mm: flange })
}

fn face(steelwork: &Steelwork, joint: &Joint, plate: &EndPlate) -> PlateFace {
    let mut own = joint.plates.iter().filter_map(|&(index, _)| steelwork.plates.get(index));
    let own = own.find(|own| own.identity.guid == plate.guid);
    let mark = own.and_then(|own| own.identity.mark.as_deref()).unwrap_or("without mark");
    let thickness = (plate.thickness.get() * 10.0).round() / 10.0;
    PlateFace {
        label: format!("{mark} {thickness} mm {}", said(&plate.grade, |g| g.0.clone(), "grade not known")),
        thickness_mm: plate.thickness.get(),
        width_mm: plate.width.get(),
        bottom_mm: plate.bottom.get(),
        top_mm: plate.top.get(),
    }
}
