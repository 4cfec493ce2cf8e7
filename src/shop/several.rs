//! Parts of several solids.

use glam::DVec3;

use super::member::LONG;
use super::plate::{flat, too_thick};
use super::reading::Reading;
use super::section::see;
use super::solid::Prism;
use super::{Part, Plate, Steelwork};
use crate::exchange::Entity;

/// A part of more solids than this that touch each other is none of steel.
pub(super) const SOLIDS: usize = 200;

impl<'a> Reading<'a> {
    /// A part of several solids: a member built up of them, or plates that are one element.
    pub fn of_several(
        &self,
        element: Entity<'a>,
        prisms: &[&Prism],
        main: &Prism,
        steelwork: &mut Steelwork,
    ) -> Result<Vec<Part>, String> {
        let count = prisms.len();
        if count > SOLIDS {
            return Err(format!("its body is {count} solids; of at most {SOLIDS} it is told what they are"));
        }
        let flats: Option<Vec<_>> = prisms.iter().map(|prism| flat(prism)).collect();
        let flats = flats.filter(|flats| flats.iter().all(|flat| too_thick(flat).is_none()));
        let whole = if flats.is_some() && !touching(prisms, self.rulebook.tolerances.touch.get()) {
            None
        } else if flat(main).is_some() {
            self.built_up(element, prisms)
        } else {
            let seen = see(&main.profile).bounds.size.max_element();
            let member = (main.depth >= LONG * seen).then(|| self.member(element, main));
            member.or_else(|| self.built_up(element, prisms)).map(|mut member| {
                member.not_assessed = Some(format!("built up of {count} solids"));
                member
            })
        };
        if let (None, Some(flats)) = (&whole, flats) {
            let plates: Vec<Plate> =
                flats.into_iter().zip(prisms).map(|(flat, prism)| self.plate(element, prism, flat)).collect();
            let first = steelwork.plates.len();
            steelwork.plates.extend(plates);
            return Ok((first..steelwork.plates.len()).map(Part::Plate).collect());
        }
        let member = whole.ok_or_else(|| format!("its body is {count} solids and none of them a member"))?;
        steelwork.members.push(member);
        Ok(vec![Part::Member(steelwork.members.len() - 1)])
    }
}

/// Whether all solids hang together, by their boxes along the axes of the first.
fn touching(prisms: &[&Prism], touch: f64) -> bool {
    let Some(first) = prisms.first() else { return false };
    let back = first.frame.inverse();
    let boxes: Vec<(DVec3, DVec3)> = prisms
        .iter()
        .map(|prism| {
            let corners = prism.corners().map(|p| back.transform_point3(p));
            corners.fold((DVec3::INFINITY, DVec3::NEG_INFINITY), |(low, high), p| (low.min(p), high.max(p)))
        })
        .collect();
    let meet = |a: &(DVec3, DVec3), b: &(DVec3, DVec3)| a.0.cmple(b.1 + touch).all() && b.0.cmple(a.1 + touch).all();
    let mut reached = vec![false; boxes.len()];
    let mut next = vec![0];
    while let Some(at) = next.pop() {
        for other in 0..boxes.len() {
            if !reached[other] && meet(&boxes[at], &boxes[other]) {
                reached[other] = true;
                next.push(other);
            }
        }
    }
    reached.into_iter().all(|one| one)
}
