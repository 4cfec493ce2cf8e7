//! Welds and their sizes by the letters of ISO 2553: a throat, z leg, s penetration, l length.

use std::f64::consts::SQRT_2;
use std::rc::Rc;

use glam::DVec3;

use super::kin::said_of;
use super::properties::{Plausible, Property};
use super::reading::Reading;
use super::solid::Prism;
use super::statement::Statement;
use super::{Weld, WeldSort};
use crate::exchange::Entity;
use crate::origin::{Ask, Datum, Known, Missing, Origin};
use crate::units::{Length, mm};

/// The standard's property set.
const SET: &str = "Pset_FastenerWeld";
/// Throat and leg of one weld agree within this share.
const AGREE: f64 = 0.05;
/// Sizes of a seam, mm.
const SIZE: Plausible = Plausible(1.0, 60.0);
/// Lengths of a seam, mm.
const LENGTH: Plausible = Plausible(5.0, 50_000.0);

/// What is said of a weld.
pub(super) struct WeldSaid {
    sort: WeldSort,
    throat: Known<Length>,
    length: Option<Known<Length>>,
}

impl<'a> Reading<'a> {
    /// Whether a part is a weld: by type, by the standard's property set, or by name. Of other classes than a
    /// fastener only what is called a weld and nothing else: a "weld plate" is a plate.
    pub fn is_weld(&self, element: Entity<'a>) -> bool {
        *self.kin(element).is_weld.get_or_init(|| self.calls_it_a_weld(element))
    }

    fn calls_it_a_weld(&self, element: Entity<'a>) -> bool {
        let has_set = || self.properties_of(element).iter().any(|p| p.set == SET);
        let names = self.names_of(element);
        if element.is_a("IfcFastener") && !element.is_a("IfcMechanicalFastener") {
            return match self.predefined(element) {
                Some("WELD") => true,
                Some("GLUE" | "MORTAR") => false,
                _ => has_set() || names.iter().any(|(_, text)| self.says("weld", text)),
            };
        }
        let may_be = element.is_a("IfcBuildingElementProxy") || element.is_a("IfcDiscreteAccessory");
        may_be && (has_set() || names.iter().any(|(_, text)| self.only_weld(text)))
    }

    /// Whether a text consists of nothing but words for a weld and numbers: "Fillet weld 12".
    fn only_weld(&self, text: &str) -> bool {
        self.says("weld", text) && self.text(text).words().says_only(&["weld", "butt-weld", "fillet-weld"])
    }

    /// A weld.
    pub fn weld(&self, element: Entity<'a>) -> Weld {
        let axis = self.axis_line(element);
        let (with, said) = self.once(element, &self.kin(element).weld, || {
            let properties = self.properties_of(element);
            let sort = self.weld_sort(element, &properties);
            let (throat, length) = (self.throat(element, &properties, sort), self.stated_length(element, &properties));
            Rc::new(WeldSaid { sort, throat, length })
        });
        Weld {
            identity: self.identity(element),
            sort: said.sort,
            throat: said_of(&said.throat, with, element),
            length: match &said.length {
                Some(length) => said_of(length, with, element),
                None => seam_length(element, axis.as_deref()),
            },
            points: self.weld_points(element).or(axis).unwrap_or_default(),
        }
    }

    fn weld_sort(&self, element: Entity<'a>, properties: &[Property<'a>]) -> WeldSort {
        // ISO 2553 names of butt preparations, besides the words.
        const FULL: [&str; 10] = ["i", "v", "hv", "u", "hu", "j", "x", "k", "dv", "dhv"];
        // With a broad root face: never through.
        const PARTIAL: [&str; 2] = ["y", "hy"];
        let seam = properties.iter().filter(|p| p.set == SET && p.name == "Type1").find_map(Property::text);
        // A stated penetration tells more than a word or a sign.
        let depth = properties.iter().any(|p| {
            let said = ["s", "DeepPenetrationThroatThickness", "a", "NominalThroatThickness"];
            p.set == SET && said.contains(&p.name)
        });
        let names = self.names_of(element);
        let names = names.iter().map(|(_, text)| *text);
        for text in seam.as_deref().into_iter().chain(names) {
            let text = self.text(text);
            let words = text.words();
            if words.says("fillet-weld") {
                return WeldSort::Fillet;
            }
            if words.says("butt-weld") || words.says("full-penetration") {
                let full = words.says("full-penetration") && !depth;
                return if full { WeldSort::FullButt } else { WeldSort::Butt };
            }
        }
        match seam {
            Some(letter) if PARTIAL.contains(&letter.to_lowercase().as_str()) => WeldSort::Butt,
            Some(letter) if FULL.contains(&letter.to_lowercase().as_str()) => {
                if depth {
                    WeldSort::Butt
                } else {
                    WeldSort::FullButt
                }
            }
            _ => WeldSort::Unknown,
        }
    }

    /// Lengths that the standard's set states under a letter (or its later name), or that the vocabulary knows.
    fn sizes(
        &self,
        element: Entity<'a>,
        properties: &[Property<'a>],
        letter: &str,
        later: &str,
        concept: &str,
        plausible: Plausible,
    ) -> Vec<Statement<'a, f64>> {
        self.property_lengths(element, properties, plausible, |p| {
            let standard = p.set == SET && (p.name == letter || p.name == later);
            standard || (p.set != SET && !concept.is_empty() && p.means(concept))
        })
    }

    fn throat(&self, element: Entity<'a>, properties: &[Property<'a>], sort: WeldSort) -> Known<Length> {
        let missing = |reason: String| Missing {
            what: "weld throat".into(),
            reason,
            at: Some(element.place()),
            ask: Ask::Fabricator,
        };
        let throats = self.sizes(element, properties, "a", "NominalThroatThickness", "weld-throat", SIZE);
        let legs = self.sizes(element, properties, "z", "WeldLegLength", "weld-leg", SIZE);
        for all in [&throats, &legs] {
            if let [first, rest @ ..] = all.as_slice()
                && let Some(other) = rest.iter().find(|s| !((s.value - first.value).abs() <= AGREE * first.value))
            {
                let (a, b) = (first.value, other.value);
                return Err(missing(format!("{} says {a:.1} mm, {} says {b:.1} mm", first.by, other.by)));
            }
        }
        let modelled = |s: &Statement<'a, f64>| Ok(Datum::new(mm(s.value), s.origin("weld")));
        match (throats.first(), legs.first()) {
            (Some(a), Some(z)) if !((a.value - z.value / SQRT_2).abs() <= AGREE * a.value) => Err(missing(format!(
                "throat and leg contradict each other: {} is {:.1} mm, {} is {:.1} mm, and a should be z/√2",
                a.by, a.value, z.by, z.value
            ))),
            (Some(a), _) => modelled(a),
            (None, Some(z)) if !matches!(sort, WeldSort::Butt | WeldSort::FullButt) => {
                let how = format!("throat a = z/√2 from {}, z = {:.1} mm ({})", z.by, z.value, z.at.place());
                Ok(Datum::new(mm(z.value / SQRT_2), Origin::Derived(how)))
            }
            _ => {
                // A butt weld's throat is its penetration, EN 1993-1-8 4.7.2; in a fillet s counts for nothing unproven.
                let penetration = self.sizes(element, properties, "s", "DeepPenetrationThroatThickness", "", SIZE);
                match penetration.first() {
                    Some(s) if sort == WeldSort::Butt => modelled(s),
                    _ => Err(missing("no throat or leg above zero is stated by the weld's properties".into())),
                }
            }
        }
    }

    /// The length of the seam, if its properties state any.
    fn stated_length(&self, element: Entity<'a>, properties: &[Property<'a>]) -> Option<Known<Length>> {
        let stated = self.sizes(element, properties, "l", "WeldElementLength", "weld-length", LENGTH);
        let [first, rest @ ..] = stated.as_slice() else { return None };
        Some(match rest.iter().find(|s| !((s.value - first.value).abs() <= 1.0)) {
            Some(other) => Err(no_length(
                element,
                format!("{} says {:.1} mm, {} says {:.1} mm", first.by, first.value, other.by, other.value),
            )),
            None => Ok(Datum::new(mm(first.value), first.origin("weld"))),
        })
    }

    /// The corners of the box of the weld's body, along its placement; of the prism itself if it is one.
    fn weld_points(&self, element: Entity<'a>) -> Option<Vec<DVec3>> {
        let solids = self.body(element).ok()?;
        let mut prisms: Vec<Prism> = Vec::new();
        for solid in solids {
            match solid {
                Ok(prism) => prisms.push(prism),
                Err(reason) => self.problem(element, format!("A weld's body can't be read: {reason}.")),
            }
        }
        let frame = match prisms.as_slice() {
            [] => return None,
            [one] => one.frame,
            _ => self.placement_of(element).ok()?,
        };
        let back = frame.inverse();
        let (mut low, mut high) = (DVec3::INFINITY, DVec3::NEG_INFINITY);
        for prism in &prisms {
            for point in &prism.profile.outer.points {
                for level in [0.0, prism.depth] {
                    let local = back.transform_point3(prism.at(*point, level));
                    low = low.min(local);
                    high = high.max(local);
                }
            }
        }
        let corner = |i: usize| {
            let pick = |bit: usize, a: f64, b: f64| if i & bit == 0 { a } else { b };
            frame.transform_point3(DVec3::new(pick(1, low.x, high.x), pick(2, low.y, high.y), pick(4, low.z, high.z)))
        };
        Some((0..8).map(corner).collect())
    }
}

/// The length of a seam of which no property states one.
fn seam_length(element: Entity<'_>, axis: Option<&[DVec3]>) -> Known<Length> {
    match axis {
        Some([a, b]) if a.distance(*b) > 0.0 => {
            Ok(Datum::new(mm(a.distance(*b)), Origin::Derived("distance of the ends of the weld's axis".into())))
        }
        _ => Err(no_length(element, "no length above zero is stated by the weld's properties or its axis".into())),
    }
}

fn no_length(element: Entity<'_>, reason: String) -> Missing {
    Missing { what: "weld length".into(), reason, at: Some(element.place()), ask: Ask::Fabricator }
}
