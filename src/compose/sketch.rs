//! The joint's geometry for drawings, from its layout.

use std::sync::Arc;

use crate::joints::{EndPlateLayout, Joint, MemberAt};
use crate::origin::Known;
use crate::review::sketch::{PlateFace, Profile, Sketch, SketchRow, SketchStiffener};
use crate::shop::{Member, Steelwork};

/// The sketch of a joint; `None` if it could not be laid out.
pub fn sketch(steelwork: &Steelwork, joint: &Joint) -> Option<Arc<Sketch>> {
    let layout = joint.layout.as_ref().ok()?;
    let member = |index: Option<usize>| index.and_then(|i| steelwork.members.get(i));
    Some(Arc::new(Sketch {
        column: profile(&layout.column, member(joint.supporting))?,
        column_top_mm: end(layout, true),
        column_bottom_mm: end(layout, false),
        beam: profile(&layout.beam, member(joint.supported))?,
        plate: plate(steelwork, joint, layout),
        bolts: format!(
            "{} {}",
            said(&layout.bolts.diameter, |d| format!("M{:.0}", d.get()), "size not known"),
            said(&layout.bolts.class, String::clone, "class not known"),
        ),
        bolt_mm: layout.bolts.diameter.as_ref().ok().map(|d| d.value.get()),
        rows: (layout.bolts.rows.iter())
            .map(|row| SketchRow {
                height_mm: row.height.get(),
                gauge_mm: row.gauge.get(),
                edge_plate_mm: row.edge_plate.get(),
                edge_column_mm: row.edge_column.get(),
            })
            .collect(),
        throats_mm: [&layout.welds.flange_top, &layout.welds.web, &layout.welds.flange_bottom]
            .map(|throat| throat.as_ref().ok().map(|a| a.value.get())),
        stiffeners: (layout.stiffeners.iter())
            .map(|stiffener| SketchStiffener {
                height_mm: stiffener.height.get(),
                thickness_mm: stiffener.thickness.get(),
                reach_mm: stiffener.reach.get(),
                both_sides: stiffener.both_sides,
                full_depth: stiffener.full_depth,
            })
            .collect(),
    }))
}

fn said<T>(known: &Known<T>, print: impl Fn(&T) -> String, unknown: &str) -> String {
    known.as_ref().map_or_else(|_| unknown.to_owned(), |datum| print(&datum.value))
}

/// Height of the column's end.
fn end(layout: &EndPlateLayout, upper: bool) -> Option<f64> {
    let (rows, reach) = (&layout.bolts.rows, if upper { layout.column_above } else { layout.column_below });
    let row = if upper { rows.first()? } else { rows.last()? };
    Some(row.height.get() + if upper { reach?.get() } else { -reach?.get() })
}

/// Its section's sizes, else those of its body.
fn profile(at: &MemberAt, member: Option<&Member>) -> Option<Profile> {
    let label = [
        at.mark.clone().unwrap_or_else(|| "without mark".into()),
        said(&at.section, |s| s.designation.clone(), "section not known"),
        said(&at.grade, |g| g.0.clone(), "grade not known"),
    ];
    let (depth, width, web, flange) = match (&at.section, member) {
        (Ok(section), _) => {
            let s = &section.value;
            (s.h.get(), s.b.get(), Some(s.t_w.get()), Some(s.t_f.get()))
        }
        (Err(_), Some(member)) => (member.extents.y, member.extents.x, None, None),
        (Err(_), None) => return None,
    };
    Some(Profile { label: label.join(" "), depth_mm: depth, width_mm: width, web_mm: web, flange_mm: flange })
}

fn plate(steelwork: &Steelwork, joint: &Joint, layout: &EndPlateLayout) -> PlateFace {
    let plate = &layout.plate;
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
