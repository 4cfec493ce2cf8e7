//! The joint in short: members, bolts, plates, welds, and the detail in lines for a comparison.

use crate::joints::{EndPlateLayout, Joint, MemberAt};
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
    let rows = joint.layout.as_ref().map_or(&[][..], |layout| &layout.bolts.rows);
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
                (width, depth) = (layout.plate.width.get(), (layout.plate.top - layout.plate.bottom).get());
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
        Ok(layout) => vec![
            brief("flange-top", &layout.welds.flange_top),
            brief("flange-bottom", &layout.welds.flange_bottom),
            brief("web", &layout.welds.web),
        ],
        Err(_) => (joint.welds.iter())
            .filter_map(|&(index, role)| Some(brief(role, &steelwork.welds.get(index)?.throat)))
            .collect(),
    }
}

/// The detail in lines, always the same lines in the same order, so that two details can be laid side by side.
pub fn lines(layout: &EndPlateLayout) -> Vec<String> {
    let or = |text: Option<String>| text.unwrap_or_else(|| "not stated".into());
    let member = |role: &str, at: &MemberAt| {
        let section = or(value(&at.section, |s| s.designation.clone()));
        format!("{role} {section} {}", or(value(&at.grade, |g| g.0.clone())))
    };
    let plate = &layout.plate;
    let mut lines = vec![
        member("column", &layout.column),
        member("beam", &layout.beam),
        format!("end plate {:.0} mm {}", plate.thickness.get(), or(value(&plate.grade, |g| g.0.clone()))),
        format!(
            "end plate {:.0} mm wide, from {:.0} to {:.0} mm",
            plate.width.get(),
            plate.bottom.get(),
            plate.top.get()
        ),
        format!(
            "bolts M{} {}",
            or(value(&layout.bolts.diameter, |d| format!("{:.0}", d.get()))),
            or(value(&layout.bolts.class, String::clone))
        ),
    ];
    for (i, row) in layout.bolts.rows.iter().enumerate() {
        lines.push(format!("row {} at {:.0} mm, gauge {:.0} mm", i + 1, row.height.get(), row.gauge.get()));
    }
    for (role, throat) in [
        ("top flange", &layout.welds.flange_top),
        ("bottom flange", &layout.welds.flange_bottom),
        ("web", &layout.welds.web),
    ] {
        lines.push(format!("weld at the {role}: throat {}", or(value(throat, |a| format!("{:.1} mm", a.get())))));
    }
    for stiffener in &layout.stiffeners {
        let sides = if stiffener.both_sides { "pair" } else { "one side only" };
        lines.push(format!(
            "stiffener at {:.0} mm: {:.0} mm {}, {sides}",
            stiffener.height.get(),
            stiffener.thickness.get(),
            or(value(&stiffener.grade, |g| g.0.clone()))
        ));
    }
    for plate in &layout.strengthening.web_plates {
        lines.push(format!(
            "web plate from {:.0} to {:.0} mm: {:.0} mm {}, {:.0} mm wide",
            plate.bottom.get(),
            plate.top.get(),
            plate.thickness.get(),
            or(value(&plate.grade, |g| g.0.clone())),
            plate.width.get()
        ));
    }
    for diagonal in &layout.strengthening.diagonals {
        let sides = if diagonal.both_sides { "pair" } else { "one side only" };
        lines.push(format!(
            "diagonal from {:.0} mm at the joint to {:.0} mm: {:.0} mm {}, {sides}",
            diagonal.near.get(),
            diagonal.far.get(),
            diagonal.thickness.get(),
            or(value(&diagonal.grade, |g| g.0.clone()))
        ));
    }
    for backing in &layout.strengthening.backing {
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
