//! Explicit relations as the second witness: they name joints, and are held against what geometry found.

use std::collections::{BTreeMap, BTreeSet};

use super::Kind;
use super::draft::Draft;
use super::rank::ranked_by_axes;
use super::scene::Scene;
use super::touch::members_meet;
use crate::shop::{Part, Told};

/// Holds every relation against the joints; relations that nothing else bears out become joints of their own.
pub(super) fn hear(scene: &Scene, drafts: &mut Vec<Draft>) {
    let mut by_bolt: BTreeMap<usize, BTreeSet<usize>> = BTreeMap::new();
    let mut by_pair: BTreeMap<(usize, usize), BTreeSet<usize>> = BTreeMap::new();
    let mut base_of: BTreeMap<Part, usize> = BTreeMap::new();
    for (index, draft) in drafts.iter().enumerate() {
        for bolt in &draft.joint.bolts {
            by_bolt.entry(*bolt).or_default().insert(index);
        }
        if draft.joint.bolts.is_empty() {
            base_of.extend(draft.joint.plates.iter().map(|(plate, _)| (Part::Plate(*plate), index)));
        }
        // All pairs: a joint has few members, and one with many is searched by its bolts.
        for (i, a) in draft.members.iter().take(8).enumerate() {
            for b in draft.members.iter().take(8).skip(i + 1) {
                by_pair.entry((*a, *b)).or_default().insert(index);
            }
        }
    }
    let mut told_only = Vec::new();
    for told in &scene.steel.told {
        let bolts: BTreeSet<usize> =
            told.by.iter().filter_map(|p| if let Part::Bolt(i) = p { Some(*i) } else { None }).collect();
        let between: BTreeSet<usize> =
            told.between.iter().filter_map(|p| if let Part::Member(i) = p { Some(*i) } else { None }).collect();
        let pair = match between.iter().copied().collect::<Vec<_>>()[..] {
            [a, b] => Some((a, b)),
            _ => None,
        };
        let mut meant: BTreeSet<usize> = bolts.iter().filter_map(|bolt| by_bolt.get(bolt)).flatten().copied().collect();
        // Bolts that pass both plates on a column's web belong to two joints: the members tell which is meant.
        if meant.len() > 1 {
            let closer: BTreeSet<usize> =
                meant.iter().copied().filter(|i| between.iter().all(|m| drafts[*i].members.contains(m))).collect();
            meant = if closer.is_empty() { meant } else { closer };
        }
        if meant.is_empty() {
            meant.extend(pair.and_then(|pair| by_pair.get(&pair)).into_iter().flatten());
            meant.extend(told.between.iter().chain(&told.by).filter_map(|part| base_of.get(part)));
        }
        for index in &meant {
            compare(scene, told, &bolts, &between, &mut drafts[*index]);
        }
        let meets = pair.is_some_and(|(a, b)| members_meet(scene.steel, a, b, scene.tolerances().touch.get()));
        if meant.is_empty() && (!bolts.is_empty() || (pair.is_some() && !meets)) {
            told_only.push(alone(scene, told, bolts.into_iter().collect(), between.into_iter().collect(), pair));
        }
    }
    drafts.extend(told_only);
}

fn compare(scene: &Scene, told: &Told, bolts: &BTreeSet<usize>, between: &BTreeSet<usize>, draft: &mut Draft) {
    draft.names.extend(told.name.as_deref().map(str::trim).filter(|name| !name.is_empty()).map(str::to_owned));
    draft.joint.place = draft.joint.place.take().or_else(|| Some(told.place.clone()));
    let found: BTreeSet<usize> = draft.joint.bolts.iter().copied().collect();
    if !bolts.is_empty() && *bolts != found {
        let both = bolts.intersection(&found).count();
        draft.joint.disagreements.push(format!(
            "its relation names {} bolts, geometry finds {}; {both} are the same",
            bolts.len(),
            found.len()
        ));
    }
    let mut strangers: Vec<String> =
        between.iter().filter(|m| !draft.members.contains(m)).map(|m| scene.label(Part::Member(*m))).collect();
    strangers.sort();
    if !strangers.is_empty() {
        draft.joint.disagreements.push(format!(
            "its relation connects {}, which geometry does not find at this joint",
            strangers.join(" and ")
        ));
    }
}

fn alone(scene: &Scene, told: &Told, bolts: Vec<usize>, members: Vec<usize>, pair: Option<(usize, usize)>) -> Draft {
    let mut draft = Draft::new(scene, Kind::OtherBolted, bolts, members);
    if let Some((supporting, supported)) = pair.map(|(a, b)| ranked_by_axes(scene, a, b)) {
        draft.joint.supporting = Some(supporting);
        draft.joint.supported = Some(supported);
        let (one, other) = (&scene.steel.members[supported], &scene.steel.members[supporting]);
        let middle = if draft.joint.bolts.is_empty() { (other.start + other.end) / 2.0 } else { draft.centre };
        draft.joint.at_end = Some(one.end.distance(middle) < one.start.distance(middle));
        if draft.joint.bolts.is_empty() {
            draft.centre = if draft.joint.at_end == Some(true) { one.end } else { one.start };
        }
    }
    let plates: BTreeSet<usize> = told
        .by
        .iter()
        .chain(&told.between)
        .filter_map(|p| if let Part::Plate(i) = p { Some(*i) } else { None })
        .collect();
    draft.joint.plates = plates.into_iter().map(|plate| (plate, "plate")).collect();
    let welds: BTreeSet<usize> =
        told.by.iter().filter_map(|p| if let Part::Weld(i) = p { Some(*i) } else { None }).collect();
    draft.joint.welds = welds.into_iter().map(|weld| (weld, "other")).collect();
    draft.joint.place = Some(told.place.clone());
    draft.names.extend(told.name.as_deref().map(str::trim).filter(|name| !name.is_empty()).map(str::to_owned));
    let what = if draft.joint.bolts.is_empty() { "its members meet nowhere" } else { "no bolt of it joins two parts" };
    let why = format!("only an explicit relation says so: in geometry {what}");
    draft.joint.disagreements.push(why.clone());
    draft.joint.layout = Err(why);
    draft
}
