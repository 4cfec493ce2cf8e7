//! What stands on the column's other flange: a joint level with this one, or something whose moment nobody can tell.

use std::collections::BTreeMap;

use super::boxes::thicknesses;
use super::draft::{Draft, Seat};
use super::scene::Scene;

/// How far a member may end off the other flange and still be held by it: a plate with packing, a short gusset, mm.
const OFF: f64 = 150.0;

/// A member that comes to the flange from outside: its axis is within 60° of the column's depth.
const COMES: f64 = 0.5;

const NOT_LEVEL: &str = "the flanges of the beams on both sides of the column are not level with each other";
const NO_JOINT: &str = "a member ends at the column's other flange in no end-plate joint that was recognised";

/// For each joint the one on the column's other flange whose soffit is nearest, if it is within the deeper beam's depth;
/// and why that one's moment does not tell the panel's shear. β of EN 1993-1-8 5.3 (Figure 5.6) is for beams level with
/// each other: above and below the height that two beams share, the panel has the shear of one of them alone.
pub(super) fn opposites(scene: &Scene, drafts: &[Draft]) -> Vec<(Option<usize>, Option<&'static str>)> {
    let mut on_column: BTreeMap<usize, Vec<(usize, Seat)>> = BTreeMap::new();
    for (index, draft) in drafts.iter().enumerate() {
        if let Some(seat) = draft.seat {
            on_column.entry(seat.column).or_default().push((index, seat));
        }
    }
    let across = |draft: &Draft| {
        let Some(seat) = draft.seat else { return (None, None) };
        let others = on_column.get(&seat.column).into_iter().flatten().filter(|(_, other)| {
            other.flange * seat.flange < 0.0 && (other.level - seat.level).abs() < other.depth.max(seat.depth)
        });
        let nearest =
            others.min_by(|(_, a), (_, b)| (a.level - seat.level).abs().total_cmp(&(b.level - seat.level).abs()));
        match nearest {
            Some((index, other)) => {
                let t_f = |draft: &Draft| draft.joint.supported.map(|i| thicknesses(&scene.steel.members[i]).0);
                let least = drafts.get(*index).and_then(t_f).zip(t_f(draft)).map(|(a, b)| a.min(b));
                let apart = (other.level - seat.level).abs();
                let apart = apart.max((other.level + other.depth - seat.level - seat.depth).abs());
                let level = least.is_some_and(|t_f| apart <= t_f / 2.0);
                (Some(*index), (!level).then_some(NOT_LEVEL))
            }
            None => (None, something_ends_there(scene, draft, seat).then_some(NO_JOINT)),
        }
    };
    drafts.iter().map(across).collect()
}

/// Whether a member comes to the column's other flange within the joint's depth.
fn something_ends_there(scene: &Scene, draft: &Draft, seat: Seat) -> bool {
    let column = &scene.steel.members[seat.column];
    let (reach, half) = (column.extents.y / 2.0, column.extents.x / 2.0);
    let others =
        scene.steel.members.iter().enumerate().filter(|(i, _)| *i != seat.column && Some(*i) != draft.joint.supported);
    let ends =
        others.filter(|(_, m)| m.along.dot(column.depth).abs() >= COMES).flat_map(|(_, m)| [(m, m.start), (m, m.end)]);
    ends.into_iter().any(|(member, end)| {
        let from = end - column.start;
        let out = -seat.flange * from.dot(column.depth);
        let level = from.dot(column.along);
        let high = member.extents.max_element() / 2.0;
        // Half of the column's depth inwards: a member may run into it.
        (0.0..=reach + OFF).contains(&out)
            && from.dot(column.across).abs() <= half + OFF
            && level + high >= seat.level
            && level - high <= seat.level + seat.depth
    })
}
