//! What every step of the recognition looks at: the steel, what touches, and the second witnesses by part.

use super::touch::{Pass, Touches};
use crate::origin::Place;
use crate::rulebook::{Rulebook, Tolerances};
use crate::shop::{Part, Steelwork};

/// Steel, rules, contacts and an index of pieces, relations and welds by part.
pub(super) struct Scene<'a> {
    pub(super) steel: &'a Steelwork,
    pub(super) rules: &'a Rulebook,
    pub(super) touches: Touches,
    pieces_of: ByPart,
    told_of: ByPart,
    welds_of: ByPart,
    bolted: Vec<bool>,
}

impl<'a> Scene<'a> {
    pub(super) fn new(steel: &'a Steelwork, rules: &'a Rulebook) -> Self {
        let touches = Touches::find(steel, &rules.tolerances);
        let pieces_of = ByPart::of(steel.pieces.iter().map(|piece| piece.parts.iter()));
        let told_of = ByPart::of(steel.told.iter().map(|told| told.between.iter().chain(&told.by)));
        let welds_of = ByPart::of(touches.welded.iter().map(|parts| parts.iter()));
        let mut bolted = vec![false; steel.plates.len()];
        for pass in touches.passes.iter().flatten() {
            if let Pass::Plate(plate) = pass {
                bolted[*plate] = true;
            }
        }
        Self { steel, rules, touches, pieces_of, told_of, welds_of, bolted }
    }

    pub(super) fn tolerances(&self) -> &Tolerances {
        &self.rules.tolerances
    }

    /// Welds that lie at a part, ascending.
    pub(super) fn welds_at(&self, part: Part) -> &[usize] {
        self.welds_of.get(part)
    }

    /// Relations that name a part, ascending.
    pub(super) fn told_of(&self, part: Part) -> &[usize] {
        self.told_of.get(part)
    }

    /// Welds without a place of their own that a relation gives to both parts.
    pub(super) fn placeless_welds(&self, a: Part, b: Part) -> Vec<usize> {
        let mut welds: Vec<usize> = shared(self.told_of(a), self.told_of(b))
            .flat_map(|told| &self.steel.told[told].by)
            .filter_map(|part| if let Part::Weld(i) = part { Some(*i) } else { None })
            .filter(|i| self.steel.welds[*i].points.is_empty())
            .collect();
        welds.sort_unstable();
        welds.dedup();
        welds
    }

    /// Whether any bolt passes through a plate.
    pub(super) fn is_bolted(&self, plate: usize) -> bool {
        self.bolted[plate]
    }

    /// Whether a weld or a piece holds two parts together.
    pub(super) fn are_one_piece(&self, a: Part, b: Part) -> bool {
        let pieces = |part| self.pieces_of.get(part);
        shared(self.welds_at(a), self.welds_at(b)).next().is_some() || shared(pieces(a), pieces(b)).next().is_some()
    }

    /// Whether a relation names both parts.
    pub(super) fn are_told(&self, a: Part, b: Part) -> bool {
        shared(self.told_of(a), self.told_of(b)).next().is_some()
    }

    /// What people call a part: its mark, else its name, else its GlobalId, else where it stands.
    pub(super) fn label(&self, part: Part) -> String {
        let who = self.steel.identity(part);
        let words = [who.mark.as_deref(), Some(who.name.as_str()), Some(who.guid.as_str())];
        if let Some(word) = words.into_iter().flatten().map(str::trim).find(|word| !word.is_empty()) {
            return word.to_owned();
        }
        let point = match part {
            Part::Member(i) => (self.steel.members[i].start + self.steel.members[i].end) / 2.0,
            Part::Plate(i) => self.steel.plates[i].centre,
            Part::Bolt(i) => (self.steel.bolts[i].start + self.steel.bolts[i].end) / 2.0,
            Part::Weld(i) => self.steel.welds[i].points.first().copied().unwrap_or_default(),
        };
        format!("unmarked part at {}", self.spot(point))
    }

    /// A point for people, in the coordinates of the exchange: whole mm.
    pub(super) fn spot(&self, point: glam::DVec3) -> String {
        let p = point + self.steel.origin;
        let whole = |x: f64| x.round() + 0.0; // no "-0"
        format!("({}, {}, {})", whole(p.x), whole(p.y), whole(p.z))
    }

    pub(super) fn place(&self, part: Part) -> Place {
        self.steel.identity(part).place.clone()
    }
}

/// Items of two ascending lists that stand in both.
pub(super) fn shared<'l>(a: &'l [usize], b: &'l [usize]) -> impl Iterator<Item = usize> + 'l {
    a.iter().copied().filter(|x| b.binary_search(x).is_ok())
}

/// Lists by part: ascending indices of what names it. One list for each sort of part, by the part's own index.
#[derive(Default)]
struct ByPart([Vec<Vec<usize>>; 4]);

impl ByPart {
    fn of<'p>(lists: impl Iterator<Item = impl Iterator<Item = &'p Part>>) -> Self {
        let mut all = Self::default();
        for (i, parts) in lists.enumerate() {
            for part in parts {
                let (sort, at) = slot(*part);
                let lists = &mut all.0[sort];
                if lists.len() <= at {
                    lists.resize_with(at + 1, Vec::new);
                }
                if lists[at].last() != Some(&i) {
                    lists[at].push(i);
                }
            }
        }
        all
    }

    fn get(&self, part: Part) -> &[usize] {
        let (sort, at) = slot(part);
        self.0[sort].get(at).map_or(&[], Vec::as_slice)
    }
}

fn slot(part: Part) -> (usize, usize) {
    match part {
        Part::Member(i) => (0, i),
        Part::Plate(i) => (1, i),
        Part::Bolt(i) => (2, i),
        Part::Weld(i) => (3, i),
    }
}
