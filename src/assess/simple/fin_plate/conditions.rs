//! What must hold for the method: rotation, ductility, full-strength welds, punching of the supporting web.

use super::numbers::Numbers;
use crate::assess::end_plate::numbers::Noted;
use crate::eurocode::notched;
use crate::joints::{Cope, On};
use crate::origin::Ask;
use crate::units::Length;

/// a/t_p of two fillets as strong as the plate, by f_y of S235, S275, S355, S460 (Steel Buildings in Europe, Multi-Storey
/// Steel Buildings, Part 5).
const FULL_STRENGTH: [(f64, f64); 4] = [(235.0, 0.46), (275.0, 0.48), (355.0, 0.55), (460.0, 0.74)];

/// Thickness of plate or web over d up to which bolts wear holes before they shear, by f_y (design guides, from memory).
const DUCTILE: [(f64, f64); 2] = [(275.0, 0.50), (355.0, 0.42)];

/// The plate's height over the beam's from which the beam's end is held against twisting (design guides).
const HELD: f64 = 0.6;

/// Notes every condition that does not hold.
pub(super) fn note(n: &Numbers<'_>, noted: &mut Noted) {
    let (t_p, f_yp) = (n.layout.thickness, n.plate_steel.f_y);
    let by = |table: &[(f64, f64)]| table.iter().find(|(f_y, _)| f_yp.get() <= *f_y).map(|(_, share)| *share);
    if let Some(a) = n.a {
        // By the plate's nominal strength: a thicker plate of the same grade has the same factor.
        let nominal = n.plate_grade.0.trim_start_matches('S').get(..3).and_then(|f_y| f_y.parse::<f64>().ok());
        let share =
            FULL_STRENGTH.iter().find(|(f_y, _)| nominal.is_some_and(|own| own <= *f_y)).map(|(_, share)| *share);
        match share {
            Some(share) if a >= share * t_p - n.rulebook.tolerances.size => {}
            Some(share) => noted.not_checked(
                "ductility of the weld",
                format!("fillets as strong as the plate want a throat of {share} t_p = {}, it is {a}: the weld may break before the plate yields", share * t_p),
                Ask::Fabricator,
            ),
            None => noted.not_checked("ductility of the weld", format!("no throat is known that is as strong as a plate of {}", n.plate_grade.0), Ask::Method),
        }
    }
    let d = n.bolts.d;
    let thin = by(&DUCTILE).is_some_and(|share| t_p <= share * d || n.beam.t_w <= share * d);
    if !thin {
        let reason = format!(
            "neither plate ({t_p}) nor web ({}) is thin enough beside a bolt of {d} to wear before the bolts shear",
            n.beam.t_w
        );
        noted.not_checked("ductility of the bolts", reason, Ask::Method);
    }
    if !(n.h_p() >= HELD * n.beam.h) {
        let reason = format!(
            "the plate is {} high, less than {HELD} of the beam's {}: it does not hold the beam's end against twisting",
            n.h_p(),
            n.beam.h
        );
        noted.not_checked("hold against twisting", reason, Ask::Engineer);
    }
    let root = n.beam.t_f + n.r_b;
    let at = |notch: Option<Cope>| notch.map_or(root, |notch| notch.depth);
    let straight = [at(n.layout.bottom_notch), n.beam.h - at(n.layout.top_notch)];
    let slack = n.rulebook.tolerances.position;
    if !(n.layout.bottom >= straight[0] - slack && n.layout.top <= straight[1] + slack) {
        noted.not_checked(
            "rotation of the joint",
            "the plate runs over the beam's root radius, flange or notched edge".into(),
            Ask::Fabricator,
        );
    }
    rotation(n, noted);
    notches(n, noted);
    if n.layout.on != On::ColumnFlange {
        web(n, noted);
    }
}

/// Whether the notched edges need no check of their stability; limits of depth of the guides, from memory.
fn notches(n: &Numbers<'_>, noted: &mut Noted) {
    let notches = [("top", n.layout.top_notch), ("bottom", n.layout.bottom_notch)];
    let all: Vec<_> = notches.into_iter().filter_map(|(at, notch)| Some((at, notch?))).collect();
    let deepest = if all.len() > 1 { 0.2 * n.beam.h } else { 0.5 * n.beam.h };
    let longest = notched::longest_stable(n.beam.h, n.beam.t_w, n.beam_steel.f_y_web);
    for (at, notch) in &all {
        if !(notch.depth <= deepest && longest.is_some_and(|longest| notch.length <= longest)) {
            let longest = longest.map_or("no figure for its steel".into(), |l| format!("{l} long"));
            let reason = format!(
                "{} long and {} deep; its edge is stable by the design guides up to {longest} and {deepest} deep",
                notch.length, notch.depth
            );
            noted.not_checked(&format!("stability of the notch at the {at}"), reason, Ask::Method);
        }
    }
    if !all.is_empty() {
        noted.assumptions.push("the notched beam is held against lateral torsional buckling".into());
    }
}

/// How far the beam's end may turn before its lower flange meets the support.
fn rotation(n: &Numbers<'_>, noted: &mut Noted) {
    let (z, gap) = (n.z().get(), n.layout.gap.get());
    // From the middle of the bolts down to the beam's soffit.
    let rows = &n.layout.bolts.rows;
    let below = rows.iter().copied().sum::<Length>().get() / rows.len() as f64;
    let reach = ((z - gap).powi(2) + below.powi(2)).sqrt();
    if z > reach {
        return;
    }
    let free = (z / reach).asin() - ((z - gap) / below).atan();
    noted.assumptions.push(format!(
        "the beam's end turns by no more than {:.0} mrad, where its lower flange meets the support (design guides, from memory)",
        1000.0 * free
    ));
    if !(free > 0.0) {
        noted.not_checked(
            "rotation of the joint",
            format!("a gap of {gap:.1} mm leaves the beam's end no room to turn"),
            Ask::Fabricator,
        );
    }
}

fn web(n: &Numbers<'_>, noted: &mut Noted) {
    let (t_p, f_yp) = (n.layout.thickness, n.plate_steel.f_y);
    let t_w = n.support.t_w;
    let most = t_w * (n.support_steel.f_u / (f_yp * n.rulebook.annex.gamma_m2));
    if !(t_p <= most) {
        let reason = format!(
            "a plate of {t_p} may punch through the supporting web of {t_w}: the design guides let it be {most} at most"
        );
        noted.not_checked("punching of the supporting web", reason, Ask::Method);
    }
    if n.layout.opposite {
        let reason = "a plate stands on the other side of the same web: the shear of both together is not assessed yet";
        noted.not_checked("supporting web in shear beside the plate", reason.into(), Ask::Method);
    }
}
