//! The steelwork as a graph: its edges are the strongest witness that two parts meet.

use super::touch::{Pass, Touches};
use super::{JointGraph, Meets};
use crate::shop::{Part, Steelwork};

/// A weld near more parts than this joins them only to itself, not pairwise.
const MOST_JOINED: usize = 8;

/// Builds the graph from geometry, pieces and relations.
pub(super) fn build(steel: &Steelwork, touches: &Touches) -> JointGraph {
    let mut graph = JointGraph::default();
    let nodes = (0..steel.members.len())
        .map(Part::Member)
        .chain((0..steel.plates.len()).map(Part::Plate))
        .chain((0..steel.bolts.len()).map(Part::Bolt))
        .chain((0..steel.welds.len()).map(Part::Weld));
    for part in nodes {
        graph.add_node(part);
    }
    let mut meet = |a: Part, b: Part, how: Meets| {
        let witness = graph.edge_weight(a, b).map_or(how, |known| how.min(*known));
        if a != b {
            graph.add_edge(a, b, witness);
        }
    };
    for (bolt, passes) in touches.passes.iter().enumerate() {
        for pass in passes {
            let part = match *pass {
                Pass::Plate(i) => Part::Plate(i),
                Pass::Member(i, _) => Part::Member(i),
            };
            meet(Part::Bolt(bolt), part, Meets::PassesThrough);
        }
    }
    for plate in 0..steel.plates.len() {
        for member in &touches.members[plate] {
            meet(Part::Plate(plate), Part::Member(*member), Meets::BearsOn);
        }
        for other in &touches.plates[plate] {
            meet(Part::Plate(plate), Part::Plate(*other), Meets::BearsOn);
        }
    }
    for (weld, parts) in touches.welded.iter().enumerate() {
        for (i, part) in parts.iter().enumerate() {
            meet(Part::Weld(weld), *part, Meets::WeldedTo);
            for other in parts[i + 1..].iter().take(MOST_JOINED) {
                meet(*part, *other, Meets::WeldedTo);
            }
        }
    }
    for piece in &steel.pieces {
        // A star round the piece's first member, so that a piece of many parts stays linear.
        let Some(hub) = piece.parts.iter().min() else { continue };
        for part in piece.parts.iter().filter(|part| *part != hub) {
            meet(*hub, *part, Meets::PartOfPiece);
        }
    }
    for told in &steel.told {
        for (i, part) in told.between.iter().enumerate() {
            for other in told.between[i + 1..].iter().take(MOST_JOINED).chain(&told.by) {
                meet(*part, *other, Meets::Told);
            }
        }
    }
    graph
}
