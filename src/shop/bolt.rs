//! Bolts: one for each shank, however the exchange grouped them, and what is no bolt although it is a fastener.

use std::cell::OnceCell;
use std::rc::Rc;

use glam::DVec3;

use super::Bolt;
use super::kin::said_of;
use super::material::said_by;
use super::properties::{By, Plausible, Property};
use super::reading::Reading;
use super::shank::{Shanks, round};
use super::solid::Prism;
use super::statement::{Statement, first_text};
use super::words::Word;
use crate::exchange::Entity;
use crate::origin::{Ask, Datum, Known, Missing, Origin};
use crate::units::{Length, mm};

/// Nominal diameters that a bolt may have, mm (M8 to M72).
const DIAMETERS: (f64, f64) = (8.0, 72.0);
/// A "bolt" drawn this much thicker than it is said to be is a hole pattern.
const HOLE_PATTERN: f64 = 1.5;
/// [`Missing::what`] of bolts whose heads are countersunk: whatever their class, they carry less in tension.
pub const COUNTERSUNK: &str = "countersunk bolts";

/// A bolt is no longer than so many diameters, an anchor is (our own choice: through-bolts of steelwork are shorter).
const LONGEST: f64 = 30.0;

/// A round bar of no name is asked for a nut only up to so many diameters: beyond it is a rod.
const SHORT: f64 = 10.0;

/// What says that a part is a bolt.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Says {
    /// Its class, or a name.
    Bolt,
    /// A name, or the type of a fastener.
    Anchor,
    /// Only that it is round and of a bolt's size: a nut or a washer on it must say more.
    Shape,
}

/// What is said of a bolt apart from its body, the same for all its kin.
pub(super) struct BoltSaid<'a> {
    stated: Vec<Statement<'a, f64>>,
    length: Known<Length>,
    class: Known<String>,
    thread: Option<Length>,
    hole: Option<Length>,
    slot: Option<Length>,
    /// Whether nuts or washers are counted.
    held: bool,
    /// Whether bolts are counted.
    counts: bool,
    /// A diameter that was worked out: for whom, and for which shank, mm.
    diameter: OnceCell<(Entity<'a>, f64, Datum<Length>)>,
}

impl<'a> Reading<'a> {
    /// What says that a part is to be looked at as a bolt, if anything does.
    pub fn bolt_by(&self, element: Entity<'a>, prisms: &[&Prism]) -> Option<Says> {
        let fastener = element.is_a("IfcMechanicalFastener");
        let called = self.called(element);
        // A round plate is no shank, whatever it is called ("anchor plate").
        let long = |p: &Prism| p.depth >= p.profile.outer.box_along(p.profile.up).size.min_element();
        let rounds: Vec<&&Prism> = prisms.iter().filter(|p| round(p) && long(p)).collect();
        if self.predefined(element) == Some("ANCHORBOLT") || (called == Some(Word::Anchor) && !rounds.is_empty()) {
            return Some(Says::Anchor);
        }
        if fastener || (called == Some(Word::Bolt) && !rounds.is_empty()) {
            return Some(Says::Bolt);
        }
        let straight = rounds.iter().all(|p| p.beyond.is_none());
        if called.is_some() || rounds.is_empty() || rounds.len() < prisms.len().div_ceil(4) || !straight {
            return None;
        }
        let clusters = self.clusters(prisms);
        let shanks: Vec<_> = clusters.iter().filter_map(|cluster| Some((cluster, cluster.shank()?))).collect();
        let of_size = |d: f64| d >= DIAMETERS.0 - 0.5 && d <= DIAMETERS.1 + 0.5;
        let bolt = |length: f64, d: f64| of_size(d) && length >= d && length <= SHORT * d;
        if shanks.len() < clusters.len() || !shanks.iter().all(|(_, s)| bolt(s.start.distance(s.end), s.diameter)) {
            return None;
        }
        let named = self.names_of(element);
        let named = named.iter().filter_map(|(_, text)| self.text(text).size());
        let drawn = shanks.first().map_or(0.0, |(_, shank)| shank.diameter);
        let by_name = { named }.any(|(d, _)| (d - drawn).abs() <= 0.1 * d);
        let headed = shanks.iter().all(|(cluster, shank)| cluster.headed(shank));
        Some(if by_name || headed { Says::Bolt } else { Says::Shape })
    }

    /// Why a fastener is none of the bolts that hold a joint, by its type or name.
    pub fn no_bolt(&self, element: Entity<'a>) -> Option<String> {
        match self.predefined(element).filter(|_| element.is_a("IfcMechanicalFastener")) {
            None | Some("BOLT" | "ANCHORBOLT" | "USERDEFINED" | "NOTDEFINED") => {}
            Some(other) => return Some(format!("a fastener of the type {other} is no bolt")),
        }
        match self.called(element)? {
            Word::Stud => Some("called a stud: no bolt".into()),
            Word::Screw => Some("called a screw, nail, rivet or dowel: no bolt".into()),
            _ => None,
        }
    }

    /// Adds the bolts of a fastener, on an error perhaps some of them; `nutted` says whether a nut or washer of its own sits on a line.
    ///
    /// # Errors
    /// Why it holds none, readable.
    pub fn bolts(
        &self,
        element: Entity<'a>,
        says: Says,
        shanks: &Shanks,
        nutted: impl Fn(DVec3, DVec3) -> bool,
        bolts: &mut Vec<Bolt>,
    ) -> Result<(), String> {
        if let Some(why) = shanks.beyond.as_ref().filter(|_| says != Says::Anchor) {
            return Err(format!("it is no straight bolt: {why}"));
        }
        if shanks.found.is_empty() {
            return Err("its body has no round shank longer than its diameter".into());
        }
        if shanks.found.len() < shanks.clusters {
            let left = shanks.clusters - shanks.found.len();
            self.problem(
                element,
                format!("{left} of its {} solids apart have no round shank and are no bolts", shanks.clusters),
            );
        }
        let (with, said) = match element.text("Name") {
            Some(_) => self.once(element, &self.kin(element).bolt, || Rc::new(self.bolt_said(element))),
            // Who has no name is called by its label, which is its own.
            None => (element, Rc::new(self.bolt_said(element))),
        };
        let length = said_of(&said.length, with, element);
        if said.counts {
            self.count(element, &self.properties_of(element), shanks.found.len());
        }
        for (shank, headed) in &shanks.found {
            let held = said.held || *headed || nutted(shank.start, shank.end);
            if says == Says::Shape && !held {
                let length = shank.start.distance(shank.end);
                return Err(format!(
                    "a round bar of {:.1} x {length:.1} mm that nothing calls a bolt, without nut or washer",
                    shank.diameter
                ));
            }
            let diameter = self.diameter_once(element, with, &said, shank.diameter)?;
            let d = diameter.value.get();
            if !(d >= DIAMETERS.0 && d <= DIAMETERS.1) {
                return Err(format!("{d:.1} mm is no bolt diameter ({} to {} mm)", DIAMETERS.0, DIAMETERS.1));
            }
            let drawn = shank.start.distance(shank.end);
            let longest = length.as_ref().map_or(drawn, |l| l.value.get().max(drawn));
            // A nut or a washer proves a bolt whose length is drawn or stated oddly.
            if !(longest >= d) && !held {
                return Err(format!(
                    "it is {longest:.1} mm long, shorter than its diameter of {d:.1} mm, without nut or washer: no bolt"
                ));
            }
            if !(longest <= LONGEST * d) && !held && says != Says::Anchor {
                return Err(format!(
                    "it is {longest:.1} mm long, more than {LONGEST} times its diameter of {d:.1} mm, without nut or washer: no bolt"
                ));
            }
            bolts.push(Bolt {
                identity: self.identity(element),
                start: shank.start,
                end: shank.end,
                diameter: Ok(diameter),
                length: length.clone(),
                thread: said.thread,
                class: said_of(&said.class, with, element),
                hole: said.hole,
                slot: said.slot,
                anchor: says == Says::Anchor,
            });
        }
        Ok(())
    }

    /// What is said of a bolt apart from its body.
    fn bolt_said(&self, element: Entity<'a>) -> BoltSaid<'a> {
        let properties = self.properties_of(element);
        let counted = |concept: &str| properties.iter().any(|p| p.means(concept) && p.count().is_some_and(|n| n > 0.0));
        BoltSaid {
            stated: self.diameters(element, &properties),
            length: self.length(element, &properties),
            class: self.class(element, &properties),
            thread: self.thread(element, &properties),
            hole: self.hole(element, &properties),
            slot: self.slot(element, &properties),
            held: counted("nut-count") || counted("washer-count"),
            counts: properties.iter().any(|p| p.means("bolt-count")),
            diameter: OnceCell::new(),
        }
    }

    /// The diameter of a shank drawn with one; as it was worked out for kin, where nobody contradicts.
    fn diameter_once(
        &self,
        element: Entity<'a>,
        with: Entity<'a>,
        said: &BoltSaid<'a>,
        drawn: f64,
    ) -> Result<Datum<Length>, String> {
        if let Some((of, as_drawn, known)) = said.diameter.get()
            && as_drawn.to_bits() == drawn.to_bits()
        {
            return said_of(&Ok(known.clone()), *of, element).map_err(|missing| missing.reason);
        }
        let own = |s: &Statement<'a, f64>| Statement { at: if s.at.id == with.id { element } else { s.at }, ..*s };
        let stated: Vec<_> = said.stated.iter().map(own).collect();
        let problems = self.problems_met();
        let diameter = self.diameter(element, &stated, drawn)?;
        // Without a statement the origin names the place in words.
        if self.problems_met() == problems && !stated.is_empty() {
            let _ = said.diameter.set((element, drawn, diameter.clone()));
        }
        Ok(diameter)
    }

    /// All that is said of the diameter: attributes, properties, names.
    fn diameters(&self, element: Entity<'a>, properties: &[Property<'a>]) -> Vec<Statement<'a, f64>> {
        let mut all = self.attribute_lengths(element, "NominalDiameter");
        all.extend(self.property_lengths(element, properties, Plausible(5.0, 100.0), |p| {
            p.name == "NominalDiameter" || p.name == "ThreadDiameter" || p.means("bolt-diameter")
        }));
        for (by, text) in self.names_of(element).iter() {
            all.extend(self.text(text).size().map(|(d, _)| Statement {
                value: d,
                by: By::Named(by, text),
                at: element,
            }));
        }
        all
    }

    /// The diameter by statements and geometry. Where they disagree the smaller one is taken, which carries less.
    fn diameter(
        &self,
        element: Entity<'a>,
        stated: &[Statement<'a, f64>],
        drawn: f64,
    ) -> Result<Datum<Length>, String> {
        let Some(least) = stated.iter().min_by(|a, b| a.value.total_cmp(&b.value)) else {
            let how = format!("diameter of the modelled shank of the fastener at {}", element.place());
            return Ok(Datum::new(mm(drawn), Origin::Derived(how)));
        };
        if drawn > HOLE_PATTERN * least.value {
            return Err(format!(
                "it is drawn {drawn:.1} mm thick but {} says {:.1} mm: a hole pattern, no bolt",
                least.by, least.value
            ));
        }
        let tolerance = self.rulebook.tolerances.size.get().max(0.02 * least.value);
        let differs = |value: f64| !((value - least.value).abs() <= tolerance);
        let mut others: Vec<String> =
            stated.iter().filter(|s| differs(s.value)).map(|s| format!("{} says {:.1} mm", s.by, s.value)).collect();
        if differs(drawn) {
            others.push(format!("its shank is drawn {drawn:.1} mm thick"));
        }
        if others.is_empty() {
            let first = stated.first().unwrap_or(least);
            return Ok(Datum::new(mm(first.value), first.origin(&self.fastener(element))));
        }
        if drawn < least.value - tolerance {
            self.problem(
                element,
                format!(
                    "Bolt diameter: {} says {:.1} mm, but {}; the smaller, {drawn:.1} mm, is taken.",
                    least.by,
                    least.value,
                    others.join(", ")
                ),
            );
            return Ok(Datum::new(
                mm(drawn),
                Origin::Derived("diameter of the modelled shank, the smaller of two that disagree".into()),
            ));
        }
        self.problem(
            element,
            format!(
                "Bolt diameter: {} says {:.1} mm, but {}; the smaller, {:.1} mm, is taken.",
                least.by,
                least.value,
                others.join(", "),
                least.value
            ),
        );
        Ok(Datum::new(mm(least.value), least.origin(&self.fastener(element))))
    }

    fn fastener(&self, element: Entity<'a>) -> String {
        format!("fastener \"{}\"", element.text("Name").unwrap_or_else(|| element.label()))
    }

    fn length(&self, element: Entity<'a>, properties: &[Property<'a>]) -> Known<Length> {
        let mut all = self.attribute_lengths(element, "NominalLength");
        all.extend(self.property_lengths(element, properties, Plausible(10.0, 3000.0), |p| {
            p.name == "NominalLength" || p.means("bolt-length")
        }));
        for (by, text) in self.names_of(element).iter() {
            let length = self.text(text).size().and_then(|(_, length)| length);
            all.extend(length.map(|value| Statement { value, by: By::Named(by, text), at: element }));
        }
        let missing = |reason: String| Missing {
            what: "bolt length".into(),
            reason,
            at: Some(element.place()),
            ask: Ask::Fabricator,
        };
        let Some(first) = all.first() else {
            return Err(missing("no attribute, property or name of the fastener states one".into()));
        };
        match all.iter().find(|s| !((s.value - first.value).abs() <= 1.0)) {
            Some(other) => Err(missing(format!(
                "{} says {:.1} mm, {} says {:.1} mm",
                first.by, first.value, other.by, other.value
            ))),
            None => Ok(Datum::new(mm(first.value), first.origin(&self.fastener(element)))),
        }
    }

    /// The strength class: materials, names and properties are all asked; two that disagree are none.
    fn class(&self, element: Entity<'a>, properties: &[Property<'a>]) -> Known<String> {
        let mut texts = self.material_texts(element);
        texts.extend(first_text(&self.names_of(element), element));
        texts.extend(properties.iter().filter(|p| p.means("bolt-class")).filter_map(said_by));
        if let Some(said) = texts.iter().find(|said| self.says("countersunk", &said.text)) {
            return Err(Missing {
                what: COUNTERSUNK.into(),
                reason: format!(
                    "{} \"{}\" calls them so; their tension resistance (k2 = 0.63, Table 3.4) is not assessed yet",
                    said.by, said.text
                ),
                at: Some(said.at.place()),
                ask: Ask::Method,
            });
        }
        let mut found = texts.iter().filter_map(|said| Some((said, self.text(&said.text).class()?)));
        let missing = |reason: String| Missing {
            what: "bolt class".into(),
            reason,
            at: Some(element.place()),
            ask: Ask::Fabricator,
        };
        let Some((witness, class)) = found.next() else {
            return Err(missing("no material, name or property of the bolts states one".into()));
        };
        if let Some((other, named)) = found.find(|(_, named)| *named != class) {
            return Err(missing(format!(
                "{} \"{}\" says {class}, {} \"{}\" says {named}",
                witness.by, witness.text, other.by, other.text
            )));
        }
        let by = format!("{} \"{}\" of the {}", witness.by, witness.text, self.fastener(element));
        Ok(Datum::new(class, Origin::Modelled { by, at: Some(witness.at.place()) }))
    }

    fn hole(&self, element: Entity<'a>, properties: &[Property<'a>]) -> Option<Length> {
        let all = self.property_lengths(element, properties, Plausible(5.0, 130.0), |p| p.means("hole-diameter"));
        let first = all.first()?;
        if let Some(other) = all.iter().find(|s| !((s.value - first.value).abs() <= 0.1)) {
            self.problem(
                element,
                format!(
                    "Hole diameter: {} says {:.1} mm, {} says {:.1} mm; neither is taken.",
                    first.by, first.value, other.by, other.value
                ),
            );
            return None;
        }
        Some(mm(first.value))
    }

    /// The length of the thread: by the standard's property, or one that the vocabulary knows.
    fn thread(&self, element: Entity<'a>, properties: &[Property<'a>]) -> Option<Length> {
        let all = self.property_lengths(element, properties, Plausible(5.0, 1000.0), |p| {
            p.name == "ThreadLength" || p.means("thread-length")
        });
        let first = all.first()?;
        all.iter().all(|s| (s.value - first.value).abs() <= 1.0).then(|| mm(first.value))
    }

    /// The length of slotted holes; of two that differ the longer one counts.
    fn slot(&self, element: Entity<'a>, properties: &[Property<'a>]) -> Option<Length> {
        let all = self.property_lengths(element, properties, Plausible(1.0, 500.0), |p| p.means("slot-length"));
        all.iter().map(|s| s.value).max_by(f64::total_cmp).map(mm)
    }

    /// Says where a property counts other bolts than are drawn.
    fn count(&self, element: Entity<'a>, properties: &[Property<'a>], drawn: usize) {
        for property in properties.iter().filter(|p| p.means("bolt-count")) {
            let Some(said) = property.count().filter(|n| *n > 0.0 && *n != drawn as f64) else { continue };
            self.problem(
                element,
                format!("{} says {said} bolts, but {drawn} are drawn; the drawn ones are taken.", property.by()),
            );
        }
    }
}
