//! Gives every joint a mark of its own, and sorts by it as people do.

use std::cmp::Ordering;
use std::collections::BTreeMap;

use super::draft::Draft;
use super::scene::Scene;
use crate::shop::Part;

/// Marks all joints, each differently, and sorts them.
pub(super) fn mark(scene: &Scene, drafts: &mut [Draft]) {
    for draft in drafts.iter_mut() {
        let only = draft.names.first().filter(|_| draft.names.len() == 1).cloned();
        draft.joint.mark = only.unwrap_or_else(|| by_members(scene, draft));
    }
    // A relation's name that several joints carry tells none of them.
    again(drafts, |draft| draft.joint.mark = by_members(scene, draft));
    again(drafts, |draft| {
        if let Some(at_end) = draft.joint.at_end {
            draft.joint.mark += if at_end { " end" } else { " start" };
        }
    });
    again(drafts, |draft| draft.joint.mark += &format!(" at {}", scene.spot(draft.centre)));
    drafts.sort_by(|a, b| {
        natural(&a.joint.mark, &b.joint.mark).then_with(|| order(a).partial_cmp(&order(b)).unwrap_or(Ordering::Equal))
    });
    let mut seen: BTreeMap<String, usize> = BTreeMap::new();
    for draft in drafts.iter_mut() {
        let count = seen.entry(draft.joint.mark.clone()).or_default();
        *count += 1;
        if *count > 1 {
            draft.joint.mark += &format!(" ({count})");
        }
    }
}

fn order(draft: &Draft) -> [f64; 3] {
    draft.centre.to_array()
}

/// Does it to every joint whose mark is not its own alone.
fn again(drafts: &mut [Draft], change: impl Fn(&mut Draft)) {
    let mut counts: BTreeMap<String, usize> = BTreeMap::new();
    for draft in drafts.iter() {
        *counts.entry(draft.joint.mark.clone()).or_default() += 1;
    }
    for draft in drafts.iter_mut().filter(|draft| counts.get(&draft.joint.mark).is_some_and(|count| *count > 1)) {
        change(draft);
    }
}

fn by_members(scene: &Scene, draft: &Draft) -> String {
    let members = [draft.joint.supported, draft.joint.supporting].into_iter().flatten();
    let mut labels: Vec<String> = members.map(|member| scene.label(Part::Member(member))).collect();
    if labels.is_empty() {
        labels = draft.members.iter().map(|member| scene.label(Part::Member(*member))).collect();
        labels.sort_by(|a, b| natural(a, b));
    }
    if labels.is_empty() {
        labels = draft.joint.plates.iter().map(|(plate, _)| scene.label(Part::Plate(*plate))).collect();
        labels.sort_by(|a, b| natural(a, b));
    }
    if labels.is_empty() { format!("bolts at {}", scene.spot(draft.centre)) } else { labels.join(" / ") }
}

/// Compares as people count: T2 before T10.
pub(super) fn natural(a: &str, b: &str) -> Ordering {
    let (mut a, mut b) = (a, b);
    loop {
        let (run_a, rest_a) = run(a);
        let (run_b, rest_b) = run(b);
        let order = match (digits(run_a), digits(run_b)) {
            (Some(x), Some(y)) => x.len().cmp(&y.len()).then(x.cmp(y)).then(run_a.cmp(run_b)),
            _ => run_a.cmp(run_b),
        };
        if order != Ordering::Equal || (rest_a.is_empty() && rest_b.is_empty()) {
            return order;
        }
        (a, b) = (rest_a, rest_b);
    }
}

/// The leading run of digits, or of anything else, and what follows.
fn run(text: &str) -> (&str, &str) {
    let digit = |c: char| c.is_ascii_digit();
    let first = text.chars().next().is_some_and(digit);
    text.split_at(text.find(|c| digit(c) != first).unwrap_or(text.len()))
}

/// A run of digits without leading zeros.
fn digits(run: &str) -> Option<&str> {
    run.starts_with(|c: char| c.is_ascii_digit()).then(|| run.trim_start_matches('0'))
}
