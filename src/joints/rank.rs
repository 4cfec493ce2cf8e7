//! Which of two members supports the other.

use glam::DVec3;

use super::frame::are_parallel;
use super::scene::Scene;
use crate::shop::Part;

/// Two members neither of which supports the other: the first by mark stands as supporting, so that the file's order
/// does not matter.
pub(super) fn of_equal_rank(scene: &Scene, members: &[usize]) -> (Option<usize>, Option<usize>) {
    let mut by_label = members.to_vec();
    let key = |i: &usize| {
        let member = &scene.steel.members[*i];
        (scene.label(Part::Member(*i)), scene.spot(member.start), member.identity.guid.clone())
    };
    by_label.sort_by_cached_key(key);
    (by_label.first().copied(), by_label.get(1).copied())
}

/// Whether two members continue each other.
pub(super) fn are_in_line(scene: &Scene, a: usize, b: usize) -> bool {
    let (a, b) = (&scene.steel.members[a], &scene.steel.members[b]);
    let aside = |point: DVec3| (point - a.start).reject_from_normalized(a.along).length();
    let deep = a.extents.max_element().max(b.extents.max_element());
    are_parallel(a.along, b.along, scene.tolerances().angle) && aside(b.start) <= deep / 2.0
}

/// (supporting, supported): the one whose end is nearer to the joint is supported; of two alike, the second by mark.
pub(super) fn ranked(scene: &Scene, a: usize, b: usize, centre: DVec3) -> (usize, usize) {
    let to_end = |i: usize| {
        let member = &scene.steel.members[i];
        member.start.distance(centre).min(member.end.distance(centre))
    };
    let (to_a, to_b) = (to_end(a), to_end(b));
    if (to_a - to_b).abs() > scene.tolerances().position.get() {
        return if to_a < to_b { (b, a) } else { (a, b) };
    }
    match of_equal_rank(scene, &[a, b]) {
        (Some(first), Some(second)) => (first, second),
        _ => (a, b),
    }
}

/// (supporting, supported) of two members that no bolts of ours join.
pub(super) fn ranked_by_axes(scene: &Scene, a: usize, b: usize) -> (usize, usize) {
    let (one, two) = (&scene.steel.members[a], &scene.steel.members[b]);
    let ends = [one.start, one.end, two.start, two.end];
    let nearest = [(0, 2), (0, 3), (1, 2), (1, 3)]
        .into_iter()
        .min_by(|x, y| ends[x.0].distance(ends[x.1]).total_cmp(&ends[y.0].distance(ends[y.1])));
    let Some((i, j)) = nearest else { return (a, b) };
    // A running member's axis passes nearer to the other's end than its own end does.
    let beside = |point: DVec3, from: DVec3, to: DVec3| {
        let t = ((point - from).dot(to - from) / (to - from).length_squared()).clamp(0.0, 1.0);
        point.distance(from.lerp(to, if t.is_finite() { t } else { 0.0 }))
    };
    let (a_to_b, b_to_a) = (beside(ends[i], two.start, two.end), beside(ends[j], one.start, one.end));
    if (a_to_b - b_to_a).abs() <= scene.tolerances().position.get() {
        let (first, second) = of_equal_rank(scene, &[a, b]);
        return first.zip(second).unwrap_or((a, b));
    }
    if a_to_b < b_to_a { (b, a) } else { (a, b) }
}
