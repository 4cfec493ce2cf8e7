//! The joint in short: members, bolts, plates, welds, and the detail in lines for a comparison.

use crate::joints::{Joint, Layout, MemberAt, Strengthening};
use crate::origin::Known;
use crate::review::{BoltsBrief, MemberBrief, PlateBrief, WeldBrief};
use crate::shop::{Member, Steelwork};
use crate::units::Length;

fn value<T, U>(known: &Known<T>, print: impl Fn(&T) -> U) -> Option<U> {
    known.as_ref().ok().map(|datum| print(&datum.value))
}

/// A member in short.
pub fn member(member: &Member) -> MemberBrief {
    MemberBrief {
        guid: member.identity.guid.clone(),
        mark: member.identity.mark.clone(),
        section: value(&member.section, |s| s.designation.clone()),
        grade: value(&member.grade, |g| g.0.clone()),
    }
}

/// One value if all agree.
fn common<T: PartialEq + Clone>(mut all: impl Iterator<Item = T>) -> Option<T> {
    let first = all.next()?;
    all.all(|other| other == first).then_some(first)
}

/// The bolts in short; without a layout only what the bolts themselves say.
pub fn bolts(steelwork: &Steelwork, joint: &Joint) -> Option<BoltsBrief> {
    if joint.bolts.is_empty() {
        return None;
    }
    let own = || joint.bolts.iter().filter_map(|&i| steelwork.bolts.get(i));
    let rows = joint.layout.as_ref().map_or(&[][..], |layout| &layout.bolts().rows);
    Some(BoltsBrief {
        count: joint.bolts.len(),
        diameter_mm: common(own().map(|b| value(&b.diameter, |d| d.get()))).flatten(),
        class: common(own().map(|b| value(&b.class, String::clone))).flatten(),
        gauge_mm: common(rows.iter().map(|row| (row.gauge.get() * 10.0).round() / 10.0)),
        row_heights_mm: rows.iter().map(|row| row.height.get()).collect(),
    })
}

/// The plates in short.
pub fn plates(steelwork: &Steelwork, joint: &Joint) -> Vec<PlateBrief> {
    let of = |&(index, role): &(usize, &'static str)| {
        let plate = steelwork.plates.get(index)?;
        let size = |axis: fn(&glam::DVec2) -> f64| {
            let all = || plate.outline.iter().map(axis);
            all().fold(f64::MIN, f64::max) - all().fold(f64::MAX, f64::min)
        };
        let (mut width, mut depth) = (size(|p| p.x), size(|p| p.y));
        match &joint.layout {
            Ok(layout) if role == "end-plate" => {
                let sides = layout.sides();
                let laid = sides.iter().map(|side| side.plate).find(|laid| laid.guid == plate.identity.guid);
                let laid = laid.unwrap_or(layout.side().plate);
                (width, depth) = (laid.width.get(), (laid.top - laid.bottom).get());
            }
            // Without a frame of the joint the shorter side is the width.
            _ if width > depth => (width, depth) = (depth, width),
            _ => {}
        }
        Some(PlateBrief {
            guid: plate.identity.guid.clone(),
            mark: plate.identity.mark.clone(),
            role: role.to_owned(),
            thickness_mm: plate.thickness.get(),
            width_mm: width,
            depth_mm: depth,
            grade: value(&plate.grade, |g| g.0.clone()),
        })
    };
    joint.plates.iter().filter_map(of).collect()
}

/// The welds in short: by place where there is a layout, else as found.
pub fn welds(steelwork: &Steelwork, joint: &Joint) -> Vec<WeldBrief> {
    let brief =
        |role: &str, throat: &Known<Length>| WeldBrief { role: role.to_owned(), throat_mm: value(throat, |a| a.get()) };
    match &joint.layout {
        Ok(layout) => (layout.sides().iter())
            .flat_map(|side| {
                [
                    brief("flange-top", &side.welds.flange_top),
                    brief("flange-bottom", &side.welds.flange_bottom),
                    brief("web", &side.welds.web),
                ]
            })
            .collect(),
        Err(_) => (joint.welds.iter())
            .filter_map(|&(index, role)| Some(brief(role, &steelwork.welds.get(index)?.throat)))
            .collect(),
    }
}

/// The detail in lines, always the same lines in the same order, so that two details can be laid side by side.
pub fn lines(layout: &Layout) -> Vec<String> {
    let or = |text: Option<String>| text.unwrap_or_else(|| "not stated".into());
    let member = |role: &str, at: &MemberAt| {
        let section = or(value(&at.section, |s| s.designation.clone()));
        format!("{role} {section} {}", or(value(&at.grade, |g| g.0.clone())))
    };
    let mut lines = Vec::new();
    lines.extend(layout.on_column().map(|layout| member("column", &layout.column)));
    let sides = layout.sides();
    let owners: &[&str] = if sides.len() > 1 { &["supported ", "supporting "] } else { &[""] };
    for (side, of) in sides.iter().zip(owners) {
        lines.push(member(&format!("{of}beam"), side.beam));
        let plate = side.plate;
        lines.push(format!(
            "{of}end plate {:.0} mm {}",
            plate.thickness.get(),
            or(value(&plate.grade, |g| g.0.clone()))
        ));
        lines.push(format!(
            "{of}end plate {:.0} mm wide, from {:.0} to {:.0} mm",
            plate.width.get(),
            plate.bottom.get(),
            plate.top.get()
        ));
    }
    for haunch in sides.iter().filter_map(|side| side.haunch) {
        lines.push(format!(
            "haunch {:.0} mm deep, {:.0} mm long, flange {:.0} × {:.0} mm, web {:.0} mm",
            haunch.depth.get(),
            haunch.length.get(),
            haunch.flange_width.get(),
            haunch.flange_thickness.get(),
            haunch.web_thickness.get()
        ));
    }
    let bolts = layout.bolts();
    lines.push(format!(
        "bolts M{} {}",
        or(value(&bolts.diameter, |d| format!("{:.0}", d.get()))),
        or(value(&bolts.class, String::clone))
    ));
    for (i, row) in bolts.rows.iter().enumerate() {
        lines.push(format!("row {} at {:.0} mm, gauge {:.0} mm", i + 1, row.height.get(), row.gauge.get()));
    }
    for (side, of) in sides.iter().zip(owners) {
        for (role, throat) in [
            ("top flange", &side.welds.flange_top),
            ("bottom flange", &side.welds.flange_bottom),
            ("web", &side.welds.web),
        ] {
            let throat = or(value(throat, |a| format!("{:.1} mm", a.get())));
            lines
                .push(format!("weld at the {of}{}{role}: throat {throat}", if of.is_empty() { "" } else { "beam's " }));
        }
    }
    for stiffener in layout.on_column().into_iter().flat_map(|layout| &layout.stiffeners) {
        let sides = if stiffener.both_sides { "pair" } else { "one side only" };
        lines.push(format!(
            "stiffener at {:.0} mm: {:.0} mm {}, {sides}",
            stiffener.height.get(),
            stiffener.thickness.get(),
            or(value(&stiffener.grade, |g| g.0.clone()))
        ));
    }
    let Some(Strengthening { web_plates, diagonals, backing }) = layout.on_column().map(|own| &own.strengthening)
    else {
        return lines;
    };
    for plate in web_plates {
        lines.push(format!(
            "web plate from {:.0} to {:.0} mm: {:.0} mm {}, {:.0} mm wide",
            plate.bottom.get(),
            plate.top.get(),
            plate.thickness.get(),
            or(value(&plate.grade, |g| g.0.clone())),
            plate.width.get()
        ));
    }
    for diagonal in diagonals {
        let sides = if diagonal.both_sides { "pair" } else { "one side only" };
        lines.push(format!(
            "diagonal from {:.0} mm at the joint to {:.0} mm: {:.0} mm {}, {sides}",
            diagonal.near.get(),
            diagonal.far.get(),
            diagonal.thickness.get(),
            or(value(&diagonal.grade, |g| g.0.clone()))
        ));
    }
    for backing in backing {
        let sides = if backing.both_sides { "pair" } else { "one side only" };
        lines.push(format!(
            "backing plates from {:.0} to {:.0} mm: {:.0} mm {}, {sides}",
            backing.bottom.get(),
            backing.top.get(),
            backing.thickness.get(),
            or(value(&backing.grade, |g| g.0.clone()))
        ));
    }
    lines
}
