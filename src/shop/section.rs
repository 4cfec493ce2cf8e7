//! A member's section: what its names say, held against what its geometry shows.

use glam::DVec2;

use super::Shape;
use super::outline::{Box2, Loop};
use super::profile::{ISizes, Kind, Profile};
use super::properties::Property;
use super::reading::Reading;
use crate::exchange::Entity;
use crate::origin::{Ask, Datum, Known, Missing, Origin};
use crate::rulebook::Section;
use crate::units::mm;

/// Outlines are drawn with rounded sizes: overall sizes may differ by this, mm.
const OUTLINE: f64 = 1.0;
/// Thicknesses read off an outline may differ by this, mm.
const OUTLINE_THICKNESS: f64 = 0.5;

/// The cross-section as geometry shows it.
#[derive(Clone, Debug)]
pub(super) struct Seen {
    pub shape: Shape,
    /// Its bounding box; the second side is the depth.
    pub bounds: Box2,
    /// Its sizes, if it is an I.
    pub sizes: Option<ISizes>,
    /// Whether the sizes are numbers of the profile (true) or read off an outline.
    pub stated: bool,
    /// Enclosed area of the outline, mm².
    pub area: f64,
    /// Why it is no I, for people.
    pub what: String,
}

/// The longer side of the bounding box that [`see`] finds, mm.
pub(super) fn extent(profile: &Profile) -> f64 {
    let across = -profile.up.perp();
    let outline = profile.kind == Kind::Outline;
    let bounds = if outline { profile.outer.least_box(across) } else { profile.outer.box_along(across) };
    bounds.size.max_element()
}

/// Looks at a profile.
pub(super) fn see(profile: &Profile) -> Seen {
    let across = -profile.up.perp();
    let own = profile.outer.box_along(across);
    let area = profile.outer.area() - profile.voids.iter().map(Loop::area).sum::<f64>();
    let seen =
        |shape, bounds, sizes, stated, what: &str| Seen { shape, bounds, sizes, stated, area, what: what.into() };
    match profile.kind {
        Kind::I(sizes) => seen(Shape::I, own, Some(sizes), true, ""),
        Kind::Hollow => seen(Shape::Hollow, own, None, false, "a hollow section"),
        Kind::Boxed => seen(Shape::Other, own, None, false, &profile.class),
        Kind::Outline => {
            let least = profile.outer.least_box(across);
            let turned = Box2 { x: least.x.perp(), centre: least.centre, size: DVec2::new(least.size.y, least.size.x) };
            for bounds in [least, turned] {
                if let Some(sizes) = i_sizes(&profile.outer, &bounds).filter(|_| profile.voids.is_empty()) {
                    return seen(Shape::I, bounds, Some(sizes), false, "");
                }
            }
            seen(Shape::Other, least, None, false, "an outline that is no I section with parallel flanges")
        }
    }
}

/// The sizes of an I in its bounding box, if the outline is a doubly symmetric I with parallel flanges; roots may be
/// facetted, the radius is not read off.
fn i_sizes(outline: &Loop, bounds: &Box2) -> Option<ISizes> {
    let (x, y) = (bounds.x, bounds.x.perp());
    let (b, h) = (bounds.size.x, bounds.size.y);
    let at = |u: f64, v: f64| bounds.centre + u * x + v * y;
    let tolerance = 1e-3 * b.max(h);
    let near = |a: f64, b: f64| (a - b).abs() <= tolerance;
    // The single symmetric chord across, at a height.
    let across = |v: f64| match outline.chords(at(0.0, v), x).as_slice() {
        [(from, to)] if near(-from, *to) => Some(to - from),
        _ => None,
    };
    // Both flanges, cut beside the web.
    let flanges = |u: f64| match outline.chords(at(u, 0.0), y).as_slice() {
        [(low, a), (c, high)] if near(*low, -h / 2.0) && near(*high, h / 2.0) && near(a - low, high - c) => {
            Some(a - low)
        }
        _ => None,
    };
    let t_w = across(1e-4 * h)?;
    let t_f = flanges(0.48 * b)?;
    let web = [-0.2, 0.2].iter().all(|share| across(share * h).is_some_and(|t| near(t, t_w)));
    let parallel = [-0.48, -0.42, 0.42].iter().all(|share| flanges(share * b).is_some_and(|t| near(t, t_f)));
    let full = [-1.0, 1.0].iter().all(|side| across(side * (h - t_f) / 2.0).is_some_and(|w| near(w, b)));
    let slender = t_w < 0.5 * b && t_f < 0.25 * h;
    (web && parallel && full && slender).then_some(ISizes { h, b, t_w, t_f, r: None })
}

impl<'a> Reading<'a> {
    /// The section of a member, and sentences on where its witnesses disagree.
    pub fn section(&self, element: Entity<'a>, profile: &Profile, seen: &Seen) -> (Known<Section>, Vec<String>) {
        let missing = |reason: String| Missing {
            what: "section".into(),
            reason,
            at: Some(element.place()),
            ask: Ask::Fabricator,
        };
        let mut found: Vec<(String, &Section)> = Vec::new();
        for (by, text) in self.section_names(element, profile) {
            if let Some(section) = self.text(&text).section() {
                found.push((format!("{by} \"{text}\""), section));
            }
        }
        let modelled = || format!("{:.1} x {:.1}", seen.bounds.size.y, seen.bounds.size.x);
        let Some((witness, section)) = found.first() else {
            return match (seen.shape, seen.sizes) {
                (Shape::I, Some(sizes)) => {
                    let (witness, notes) = self.by_material(element, seen, sizes);
                    let own = match &witness {
                        Some((profile, sizes)) => self.own_section(element, profile, true, *sizes),
                        None => self.own_section(element, profile, seen.stated, sizes),
                    };
                    (own.map_err(missing), notes)
                }
                (shape, _) => {
                    let what = if shape == Shape::Hollow { "a hollow section" } else { &*seen.what };
                    (
                        Err(missing(format!("it is {what}, {} mm, and no name states an I or H section", modelled()))),
                        Vec::new(),
                    )
                }
            };
        };
        if let Some((other_witness, other)) = found.iter().find(|(_, other)| other.designation != section.designation) {
            let sentence = format!(
                "its names disagree on the section: {witness} is {}, {other_witness} is {}",
                section.designation, other.designation
            );
            return (Err(missing(sentence.clone())), vec![sentence]);
        }
        match self.against(section, seen) {
            None => {
                let table = self.rulebook.section_source(&section.designation).unwrap_or("section table");
                let table = format!("{table}, {} by {witness}, agrees with the geometry", section.designation);
                (Ok(Datum::new((*section).clone(), Origin::LookedUp(table))), Vec::new())
            }
            Some(difference) => {
                let (h, b) = (section.h.get(), section.b.get());
                let sentence =
                    format!("named {} ({h:.1} x {b:.1}) but modelled {}{difference}", section.designation, modelled());
                (Err(missing(sentence.clone())), vec![sentence])
            }
        }
    }

    /// What speaks against the catalogue's sizes, if anything does.
    fn against(&self, section: &Section, seen: &Seen) -> Option<String> {
        let size = self.rulebook.tolerances.size.get();
        let off = |a: f64, b: f64, tolerance: f64| !((a - b).abs() <= tolerance);
        let (overall, thickness) = if seen.stated { (size, size) } else { (OUTLINE, OUTLINE_THICKNESS) };
        let (b, h) = (seen.bounds.size.x, seen.bounds.size.y);
        let outer = off(section.h.get(), h, overall) || off(section.b.get(), b, overall);
        match seen.sizes {
            Some(sizes) => {
                let inner =
                    off(section.t_w.get(), sizes.t_w, thickness) || off(section.t_f.get(), sizes.t_f, thickness);
                let root = |r: f64| section.r.is_some_and(|expected| off(expected.get(), r, OUTLINE));
                if inner {
                    Some(format!(
                        " with web {:.1} and flange {:.1} instead of {:.1} and {:.1}",
                        sizes.t_w,
                        sizes.t_f,
                        section.t_w.get(),
                        section.t_f.get()
                    ))
                } else if sizes.r.is_some_and(root) {
                    Some(format!(" with another root radius ({:.1})", sizes.r.unwrap_or_default()))
                } else {
                    outer.then(String::new)
                }
            }
            // No I can be read off: box and area must both fit, or it is something else of that name.
            None if outer => Some(String::new()),
            None => (!((seen.area / section.area.get() - 1.0).abs() <= 0.05)).then(|| format!(" as {}", seen.what)),
        }
    }

    /// The I profile of the part's material that agrees with an outline: it knows the radius, which the outline hides.
    /// Else a sentence where it disagrees with the body.
    fn by_material(&self, element: Entity<'a>, seen: &Seen, sizes: ISizes) -> (Option<(Profile, ISizes)>, Vec<String>) {
        let mut notes = Vec::new();
        for mut profile in self.material_profiles(element) {
            let Kind::I(said) = profile.kind else { continue };
            let near = |a: f64, b: f64, tolerance: f64| (a - b).abs() <= tolerance;
            let agree = near(said.h, sizes.h, OUTLINE)
                && near(said.b, sizes.b, OUTLINE)
                && near(said.t_w, sizes.t_w, OUTLINE_THICKNESS)
                && near(said.t_f, sizes.t_f, OUTLINE_THICKNESS);
            if agree && !seen.stated {
                profile.of_material = true;
                return (Some((profile, said)), notes);
            }
            if !agree {
                let written = |s: ISizes| format!("{:.1} x {:.1} x {:.1} x {:.1}", s.h, s.b, s.t_w, s.t_f);
                notes.push(format!("its material's profile is {} but modelled {}", written(said), written(sizes)));
            }
        }
        (None, notes)
    }

    /// An I section of which no table knows the name, by the model's own sizes.
    fn own_section(
        &self,
        element: Entity<'a>,
        profile: &Profile,
        stated: bool,
        sizes: ISizes,
    ) -> Result<Datum<Section>, String> {
        let named = profile.name.clone().or_else(|| element.text("ObjectType").map(str::to_owned));
        let designation =
            named.unwrap_or_else(|| format!("I {:.1}x{:.1}x{:.1}x{:.1}", sizes.h, sizes.b, sizes.t_w, sizes.t_f));
        // Rolled or welded: only a root radius tells, and then it is rolled.
        let rolled = sizes.r.is_some();
        let section = Section::from_sizes(
            &designation,
            mm(sizes.h),
            mm(sizes.b),
            mm(sizes.t_w),
            mm(sizes.t_f),
            sizes.r.map(mm),
            rolled,
        )?;
        let origin = if stated {
            let whose = if profile.of_material { "the material's profile" } else { "the profile" };
            Origin::Modelled { by: format!("sizes of {whose} \"{designation}\""), at: Some(profile.place.clone()) }
        } else {
            Origin::Derived(format!("sizes read off the outline of the profile ({})", profile.place))
        };
        Ok(Datum::new(section, origin))
    }

    /// Every text that may name the section, with what holds it.
    fn section_names(&self, element: Entity<'a>, profile: &Profile) -> Vec<(String, String)> {
        let mut names: Vec<(String, String)> =
            profile.name.iter().map(|name| ("profile name".to_owned(), name.clone())).collect();
        names.extend(self.profile_set_names(element));
        names.extend(self.names_of(element).iter().map(|(by, text)| ((*by).to_owned(), (*text).to_owned())));
        let properties = self.properties_of(element);
        let sections = |p: &&Property<'_>| p.means("section");
        names.extend(
            properties.iter().filter(sections).filter_map(|p| Some((p.by().to_string(), p.text()?.into_owned()))),
        );
        names
    }
}
