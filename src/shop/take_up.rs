//! Goes through the exchange's elements in file order and tells each by its function.

use std::collections::BTreeMap;

use glam::DVec3;

use super::plate::{flat, too_thick};
use super::profile::Kind;
use super::reading::Reading;
use super::section::see;
use super::shank::{SMALL, round, small_part};
use super::solid::Prism;
use super::words::Word;
use super::{Part, Rejected, Shape, Steelwork};
use crate::exchange::{Entity, Exchange, Id};
use crate::rulebook::Rulebook;

/// Coordinates beyond this lose digits in what follows and get a local origin, mm.
const FAR: f64 = 1e6;
/// A profile without a known section is a member only if it is this much longer than wide.
const LONG: f64 = 2.0;
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

/// Takes up the steelwork of an exchange. Every element ends as a part, a piece, an opening or a rejection.
pub fn take_up(exchange: &Exchange, rulebook: &Rulebook) -> Steelwork {
    let reading = Reading::new(exchange, rulebook);
    let mut steelwork = Steelwork::default();
    let mut parts: BTreeMap<Id, Vec<Part>> = BTreeMap::new();
    let mut wholes = Vec::new();
    for element in exchange.entities.of_class("IfcElement") {
        if element.is_a("IfcFeatureElementSubtraction") {
            continue; // taken with the element that it voids
        }
        let whole = !reading.parts_of(element).is_empty();
        if element.is_a("IfcElementAssembly") || (whole && element.entity("Representation").is_none()) {
            wholes.push(element);
            continue;
        }
        match reading.take(element, &mut steelwork) {
            Ok(taken) => {
                parts.insert(element.id, taken);
                if whole {
                    wholes.push(element);
                }
            }
            Err(reason) => steelwork.rejected.push(Rejected { identity: reading.identity(element), reason }),
        }
    }
    for whole in wholes {
        match reading.piece(whole, &parts) {
            Some(piece) => steelwork.pieces.push(piece),
            None if parts.contains_key(&whole.id) => {}
            None => {
                let reason = "an assembly of which no part was taken up".to_owned();
                steelwork.rejected.push(Rejected { identity: reading.identity(whole), reason });
            }
        }
    }
    steelwork.told = reading.told(&parts);
    // Rejected assemblies were met last; places put them back into the order of the file.
    steelwork.rejected.sort_by(|a, b| a.identity.place.cmp(&b.identity.place));
    steelwork.problems = reading.into_problems();
    steelwork.shift();
    steelwork
}

impl<'a> Reading<'a> {
    /// Takes up one element.
    ///
    /// # Errors
    /// Why it was not taken up.
    fn take(&self, element: Entity<'a>, steelwork: &mut Steelwork) -> Result<Vec<Part>, String> {
        if self.is_weld(element) {
            steelwork.welds.push(self.weld(element));
            return Ok(vec![Part::Weld(steelwork.welds.len() - 1)]);
        }
        if element.is_a("IfcFeatureElement") {
            return Err(format!("{} adds to another element or marks it; it is not taken up", element.class()));
        }
        let fastener = element.is_a("IfcMechanicalFastener");
        if let Some(reason) = self.no_bolt(element).filter(|_| fastener) {
            return Err(reason);
        }
        let solids = self.body(element)?;
        let prisms: Vec<&Prism> = solids.iter().filter_map(|solid| solid.as_ref().ok()).collect();
        let unread: Vec<&String> = solids.iter().filter_map(|solid| solid.as_ref().err()).collect();
        if prisms.is_empty() || (!unread.is_empty() && !fastener) {
            return Err(unread.first().map_or_else(|| "it has no body".into(), |reason| (*reason).clone()));
        }
        if self.may_be_bolt(element, &prisms) {
            if let Some(reason) = unread.first() {
                let count = unread.len();
                self.problem(
                    element,
                    format!("{count} of the fastener's solids can't be read ({reason}); the others are."),
                );
            }
            let bolts = self.bolts(element, &prisms)?;
            let first = steelwork.bolts.len();
            steelwork.bolts.extend(bolts);
            return Ok((first..steelwork.bolts.len()).map(Part::Bolt).collect());
        }
        if let Some(material) = self.not_of_steel(element) {
            return Err(format!("its material \"{material}\" is no steel"));
        }
        if NO_STEELWORK.iter().any(|class| element.is_a(class)) && self.grade(element).is_err() {
            return Err(format!("{} without a steel grade: no steelwork", element.class()));
        }
        if let Some(reason) = self.small(element, &prisms) {
            return Err(reason);
        }
        self.by_shape(element, &prisms, steelwork)
    }

    /// Nuts and washers come as any class: by name if they are small, else by shape.
    fn small(&self, element: Entity<'a>, prisms: &[&Prism]) -> Option<String> {
        let extent = |p: &&Prism| see(&p.profile).bounds.size.max_element().max(p.depth);
        let little = prisms.iter().all(|p| extent(p) <= SMALL);
        match self.called(element) {
            Some(Word::Nut) if little => Some("nut".into()),
            Some(Word::Washer) if little => Some("washer".into()),
            Some(Word::Stud) if prisms.iter().any(|p| round(p)) => Some("called a stud: no bolt".into()),
            _ => small_part(prisms),
        }
    }

    /// A plate or a member, by shape.
    fn by_shape(&self, element: Entity<'a>, prisms: &[&Prism], steelwork: &mut Steelwork) -> Result<Vec<Part>, String> {
        let volume = |p: &&Prism| p.profile.outer.area() * p.depth;
        let Some(main) = prisms.iter().max_by(|a, b| volume(a).total_cmp(&volume(b))) else {
            return Err("it has no body".into());
        };
        if let ([_], Some(flat)) = (prisms, flat(main)) {
            if let Some(reason) = too_thick(&flat) {
                return Err(reason);
            }
            steelwork.plates.push(self.plate(element, main, flat));
            return Ok(vec![Part::Plate(steelwork.plates.len() - 1)]);
        }
        let seen = see(&main.profile);
        let size = seen.bounds.size;
        let long = main.depth >= LONG * size.max_element();
        let section =
            main.profile.kind != Kind::Outline || seen.shape == Shape::I || seen.area < OPEN * size.x * size.y;
        if !(long || section) || (prisms.len() > 1 && flat(main).is_some()) {
            return Err(if prisms.len() > 1 {
                format!("its body is {} solids and none of them a member", prisms.len())
            } else {
                format!(
                    "a block of {:.0} x {:.0} x {:.0} mm: neither flat as a plate nor long as a member",
                    size.x, size.y, main.depth
                )
            });
        }
        let mut member = self.member(element, main);
        if prisms.len() > 1 {
            member.not_assessed = Some(format!("built up of {} solids", prisms.len()));
        }
        steelwork.members.push(member);
        Ok(vec![Part::Member(steelwork.members.len() - 1)])
    }
}

impl Steelwork {
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
