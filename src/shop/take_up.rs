//! Goes through the exchange's elements in file order and tells each by its function.

use std::collections::BTreeMap;

use glam::DVec3;
use rayon::prelude::*;

use super::bolt::Says;
use super::hardware::{Hardware, Lines};
use super::member::LONG;
use super::plate::{flat, too_thick};
use super::profile::Kind;
use super::reading::{Common, Reading};
use super::section::{extent, see};
use super::several::SOLIDS;
use super::shank::{SMALL, Shanks, round, small_part};
use super::solid::Prism;
use super::words::Word;
use super::{Bolt, Part, Rejected, Shape, Steelwork};
use crate::exchange::{Entity, Exchange, Id};
use crate::origin::Problem;
use crate::rulebook::Rulebook;

/// Coordinates beyond this lose digits in what follows and get a local origin, mm.
const FAR: f64 = 1e6;
/// An outline that fills less of its box than this is a section (angle, channel), not a block.
const OPEN: f64 = 0.6;

/// Classes that are steelwork only if a steel grade says so.
const NO_STEELWORK: [&str; 20] = [
    "IfcChimney",
    "IfcCivilElement",
    "IfcCovering",
    "IfcCurtainWall",
    "IfcDistributionElement",
    "IfcDoor",
    "IfcFooting",
    "IfcFurnishingElement",
    "IfcGeographicElement",
    "IfcPile",
    "IfcRamp",
    "IfcReinforcingElement",
    "IfcRoof",
    "IfcShadingDevice",
    "IfcSlab",
    "IfcStair",
    "IfcTransportElement",
    "IfcVirtualElement",
    "IfcWall",
    "IfcWindow",
];

/// What an element is, once it is known to be none of the parts that are told apart only by others.
enum Found {
    Parts(Vec<Part>),
    /// Perhaps a bolt: what says so, and what its solids show.
    Bolt(Says, Shanks),
    /// A nut or a washer.
    Hardware(Word, Vec<Prism>),
}

/// So many elements are taken up by one thread in a go: they share what they have in common.
const GO: usize = 2048;

/// What came of some elements.
#[derive(Default)]
struct Taken<'a> {
    steelwork: Steelwork,
    parts: Vec<(Id, Vec<Part>)>,
    wholes: Vec<Entity<'a>>,
    bolts: Vec<(Entity<'a>, Says, Shanks)>,
    hardware: Vec<Hardware>,
}

/// Takes up the steelwork of an exchange. Every element ends as a part, a piece, an opening or a rejection.
pub fn take_up(exchange: &Exchange, rulebook: &Rulebook) -> Steelwork {
    let mut problems = Vec::new();
    let common = Common::of(exchange, rulebook, &mut problems);
    let elements = &common.links.elements;
    let mut taken: Vec<Taken<'_>> = elements.par_chunks(GO).map(|some| Taken::of(&common, some)).collect();
    if common.links.spent() && elements.len() > GO {
        // Each go reads shared bodies for itself. Which elements get no more must not depend on who came first.
        common.links.refill(common.entities);
        taken = vec![Taken::of(&common, elements)];
    }
    let mut steelwork = Steelwork { problems, ..Steelwork::default() };
    steelwork.members.reserve_exact(taken.iter().map(|some| some.steelwork.members.len()).sum());
    steelwork.plates.reserve_exact(taken.iter().map(|some| some.steelwork.plates.len()).sum());
    steelwork.welds.reserve_exact(taken.iter().map(|some| some.steelwork.welds.len()).sum());
    let mut parts: BTreeMap<Id, Vec<Part>> = BTreeMap::new();
    let (mut wholes, mut bolts, mut hardware) = (Vec::new(), Vec::new(), Vec::new());
    for some in taken {
        let moved = steelwork.append(some.steelwork);
        parts.extend(some.parts.into_iter().map(|(id, of)| (id, of.into_iter().map(&moved).collect())));
        wholes.extend(some.wholes);
        bolts.extend(some.bolts);
        hardware.extend(some.hardware);
    }
    tell_bolts(&common, bolts, hardware, &mut steelwork, &mut parts);
    let reading = common.reading();
    for whole in wholes {
        match reading.piece(whole, &parts) {
            Some(piece) => steelwork.pieces.push(piece),
            None if parts.contains_key(&whole.id) || whole.entity("Representation").is_some() => {}
            None => {
                let reason = "an assembly of which no part was taken up".to_owned();
                steelwork.rejected.push(Rejected { identity: reading.identity(whole), reason });
            }
        }
    }
    steelwork.told = reading.told(&parts);
    // Rejected assemblies and fasteners were met last; places put them back into the order of the file.
    steelwork.rejected.sort_by(|a, b| a.identity.place.cmp(&b.identity.place));
    steelwork.problems.extend(reading.into_problems());
    steelwork.problems.sort();
    steelwork.problems.dedup();
    steelwork.shift();
    steelwork
}

impl<'a> Taken<'a> {
    fn of(common: &Common<'a>, elements: &[Id]) -> Self {
        let reading = common.reading();
        let mut all = Self::default();
        for id in elements {
            let element = common.entities.get(*id);
            if element.is_a("IfcFeatureElementSubtraction") {
                continue; // taken with the element that it voids
            }
            let whole = !reading.parts_of(element).is_empty();
            if element.is_a("IfcElementAssembly") || (whole && element.entity("Representation").is_none()) {
                all.wholes.push(element);
                continue;
            }
            if whole {
                all.wholes.push(element);
            }
            match reading.take(element, &mut all.steelwork) {
                Ok(Found::Parts(taken)) => all.parts.push((element.id, taken)),
                Ok(Found::Bolt(says, shanks)) => all.bolts.push((element, says, shanks)),
                Ok(Found::Hardware(what, prisms)) => all.hardware.extend(reading.hardware(element, what, &prisms)),
                Err(reason) => {
                    all.steelwork.rejected.push(Rejected { identity: reading.identity(element), reason });
                }
            }
        }
        all.steelwork.problems = reading.into_problems();
        all
    }
}

/// The bolts of some fasteners, how many of each or why it holds none, and what could not be understood.
type Asked = (Vec<Bolt>, Vec<Result<usize, String>>, Vec<Problem>);

/// Decides on bolts, with the nuts and washers that lie apart from them as evidence.
fn tell_bolts<'a>(
    common: &Common<'a>,
    bolts: Vec<(Entity<'a>, Says, Shanks)>,
    hardware: Vec<Hardware>,
    steelwork: &mut Steelwork,
    parts: &mut BTreeMap<Id, Vec<Part>>,
) {
    let tolerances = &common.rulebook.tolerances;
    let (aside, straight) = (2.0 * tolerances.position.get(), tolerances.angle.to_radians().sin());
    let mut nuts = Lines::default();
    for piece in &hardware {
        nuts.put(piece.at, piece.at + piece.axis);
    }
    // A nut sits at an end or within: the shank is asked at short steps.
    let nutted = |from: DVec3, to: DVec3| {
        let axis = (to - from).normalize_or_zero();
        let steps = (from.distance(to) / 50.0).ceil().clamp(1.0, 64.0);
        (0..=steps as usize).any(|i| nuts.hold(from.lerp(to, i as f64 / steps), axis, aside, straight))
    };
    let told: Vec<Asked> = bolts
        .par_chunks(GO)
        .map(|some| {
            let reading = common.reading();
            let mut found = Vec::with_capacity(some.len());
            let mut tell = |(element, says, shanks): &(Entity<'a>, Says, Shanks)| {
                let first = found.len();
                let told = reading.bolts(*element, *says, shanks, nutted, &mut found);
                told.map(|()| found.len() - first).inspect_err(|_| found.truncate(first))
            };
            let counts = some.iter().map(&mut tell).collect();
            (found, counts, reading.into_problems())
        })
        .collect();
    let reading = common.reading();
    steelwork.bolts.reserve_exact(told.iter().map(|(found, ..)| found.len()).sum());
    for (some, (found, counts, problems)) in bolts.chunks(GO).zip(told) {
        let mut first = steelwork.bolts.len();
        steelwork.bolts.extend(found);
        steelwork.problems.extend(problems);
        for ((element, ..), count) in some.iter().zip(counts) {
            match count {
                Ok(count) => {
                    parts.insert(element.id, (first..first + count).map(Part::Bolt).collect());
                    first += count;
                }
                Err(reason) => steelwork.rejected.push(Rejected { identity: reading.identity(*element), reason }),
            }
        }
    }
    let mut shanks = Lines::default();
    if !hardware.is_empty() {
        steelwork.bolts.iter().for_each(|bolt| shanks.put(bolt.start, bolt.end));
    }
    for mut piece in hardware {
        let held = shanks.hold(piece.at, piece.axis, aside, straight);
        let what = if piece.what == Word::Nut { "nut or bolt head" } else { "washer" };
        piece.rejected.reason = if held { what.to_owned() } else { format!("{what} on whose axis no bolt was found") };
        steelwork.rejected.push(piece.rejected);
    }
}

impl<'a> Reading<'a> {
    /// Takes up one element.
    ///
    /// # Errors
    /// Why it was not taken up.
    fn take(&self, element: Entity<'a>, steelwork: &mut Steelwork) -> Result<Found, String> {
        if self.is_weld(element) {
            steelwork.welds.push(self.weld(element));
            return Ok(Found::Parts(vec![Part::Weld(steelwork.welds.len() - 1)]));
        }
        if element.is_a("IfcFeatureElement") {
            return Err(format!("{} adds to another element or marks it; it is not taken up", element.class()));
        }
        let fastener = element.is_a("IfcMechanicalFastener");
        if let Some(reason) = self.no_bolt(element).filter(|_| fastener) {
            return Err(reason);
        }
        let (mut prisms, mut unread) = (Vec::new(), Vec::new());
        for solid in self.body(element)? {
            match solid {
                Ok(prism) => prisms.push(prism),
                Err(reason) => unread.push(reason),
            }
        }
        if prisms.is_empty() || (!unread.is_empty() && !fastener && prisms.len() > SOLIDS) {
            return Err(unread.into_iter().next().unwrap_or_else(|| "it has no body".into()));
        }
        let seen: Vec<&Prism> = prisms.iter().collect();
        if let Some(what) = self.small(element, &seen) {
            return Ok(Found::Hardware(what, prisms));
        }
        if let Some(says) = self.bolt_by(element, &seen) {
            if let Some(reason) = unread.first() {
                let count = unread.len();
                self.problem(
                    element,
                    format!("{count} of the fastener's solids can't be read ({reason}); the others are."),
                );
            }
            return Ok(Found::Bolt(says, self.shanks(&seen)));
        }
        if let Some(material) = self.not_of_steel(element) {
            return Err(format!("its material \"{material}\" is no steel"));
        }
        if NO_STEELWORK.iter().any(|class| element.is_a(class)) && self.grade(element).is_err() {
            return Err(format!("{} without a steel grade: no steelwork", element.class()));
        }
        if let Some(reason) = self.no_bolt(element).filter(|_| seen.iter().any(|p| round(p))) {
            return Err(reason);
        }
        let parts = self.by_shape(element, &seen, steelwork)?;
        if let Some(reason) = unread.first() {
            steelwork.is_partly_read(&parts, reason, unread.len());
        }
        Ok(Found::Parts(parts))
    }

    /// Nuts and washers come as any class: by name if they are small, else by shape.
    fn small(&self, element: Entity<'a>, prisms: &[&Prism]) -> Option<Word> {
        let extent = |p: &&Prism| extent(&p.profile).max(p.depth);
        let little = || prisms.iter().all(|p| extent(p) <= SMALL);
        match self.called(element) {
            Some(word @ (Word::Nut | Word::Washer)) if little() => Some(word),
            // A short bolt in several solids is no nut.
            Some(Word::Bolt | Word::Anchor) if prisms.len() > 1 => None,
            _ => small_part(prisms),
        }
    }

    /// Nuts or washers with their axis; without a plain one they are told of and prove nothing.
    fn hardware(&self, element: Entity<'a>, what: Word, prisms: &[Prism]) -> Vec<Hardware> {
        let all: Vec<&Prism> = prisms.iter().collect();
        let identity = self.identity(element);
        let one = |prism: &Prism| {
            let centre = prism.profile.outer.least_box(glam::DVec2::X).centre;
            Hardware {
                what,
                at: prism.at(centre, prism.depth / 2.0),
                axis: prism.axis(),
                rejected: Rejected { identity: identity.clone(), reason: String::new() },
            }
        };
        self.clusters(&all).iter().filter_map(|cluster| cluster.first()).map(one).collect()
    }

    /// Plates or a member, by shape.
    fn by_shape(&self, element: Entity<'a>, prisms: &[&Prism], steelwork: &mut Steelwork) -> Result<Vec<Part>, String> {
        let Some(main) = prisms.iter().max_by(|a, b| a.bulk().total_cmp(&b.bulk())) else {
            return Err("it has no body".into());
        };
        if let ([_], Some(member)) = (prisms, self.curved_bar(element, main)) {
            steelwork.members.push(member);
            return Ok(vec![Part::Member(steelwork.members.len() - 1)]);
        }
        if let ([_], Some(flat)) = (prisms, flat(main)) {
            if let Some(reason) = too_thick(&flat) {
                return Err(reason);
            }
            steelwork.plates.push(self.plate(element, main, flat));
            return Ok(vec![Part::Plate(steelwork.plates.len() - 1)]);
        }
        if prisms.len() > 1 {
            return self.of_several(element, prisms, main, steelwork);
        }
        let seen = see(&main.profile);
        let size = seen.bounds.size;
        let long = main.depth >= LONG * size.max_element();
        let section =
            main.profile.kind != Kind::Outline || seen.shape == Shape::I || seen.area < OPEN * size.x * size.y;
        if !(long || section || main.beyond.is_some()) {
            return Err(format!(
                "a block of {:.0} x {:.0} x {:.0} mm: neither flat as a plate nor long as a member",
                size.x, size.y, main.depth
            ));
        }
        steelwork.members.push(self.member(element, main));
        Ok(vec![Part::Member(steelwork.members.len() - 1)])
    }
}

impl Steelwork {
    /// Takes up what another holds of members, plates, welds, rejections and problems; says which part is which then.
    fn append(&mut self, mut other: Self) -> impl Fn(Part) -> Part + use<> {
        let (members, plates, bolts, welds) =
            (self.members.len(), self.plates.len(), self.bolts.len(), self.welds.len());
        self.members.append(&mut other.members);
        self.plates.append(&mut other.plates);
        self.bolts.append(&mut other.bolts);
        self.welds.append(&mut other.welds);
        self.rejected.append(&mut other.rejected);
        self.problems.append(&mut other.problems);
        move |part| match part {
            Part::Member(i) => Part::Member(members + i),
            Part::Plate(i) => Part::Plate(plates + i),
            Part::Bolt(i) => Part::Bolt(bolts + i),
            Part::Weld(i) => Part::Weld(welds + i),
        }
    }

    /// Says of parts that some of their solids can't be read: a member is not assessed then.
    fn is_partly_read(&mut self, parts: &[Part], reason: &str, count: usize) {
        let sentence = format!("{count} of its solids can't be read ({reason})");
        for part in parts {
            match part {
                Part::Member(i) => self.members[*i].not_assessed = Some(sentence.clone()),
                Part::Plate(i) => self.plates[*i].disagreements.push(sentence.clone()),
                Part::Bolt(_) | Part::Weld(_) => {}
            }
        }
    }

    /// Takes a common origin (in whole metres) off coordinates that are too large.
    fn shift(&mut self) {
        let firsts = [
            self.members.first().map(|m| m.start),
            self.plates.first().map(|p| p.centre),
            self.bolts.first().map(|b| b.start),
        ];
        let Some(first) = firsts.into_iter().flatten().next() else { return };
        if !(first.abs().max_element() > FAR) {
            return;
        }
        let origin: DVec3 = (first / 1e3).round() * 1e3;
        self.origin = origin;
        self.members.iter_mut().for_each(|m| {
            m.start -= origin;
            m.end -= origin;
        });
        self.plates.iter_mut().for_each(|p| p.centre -= origin);
        self.bolts.iter_mut().for_each(|b| {
            b.start -= origin;
            b.end -= origin;
        });
        self.welds.iter_mut().for_each(|w| w.points.iter_mut().for_each(|p| *p -= origin));
    }
}
