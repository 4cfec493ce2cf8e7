//! What stands on a sheet, in order; how it looks is a matter of [`text`](super::text) and [`html`](super::html).

use super::formula::{Line, Piece, text};
use super::working::{self, WorkLine};
use super::{geometry, parts};
use crate::report::group;
use crate::review::{CheckResult, JointReview, Review};
use crate::working::Working;

/// A part of a section.
#[derive(Clone, Debug)]
pub(super) enum Block {
    /// A paragraph.
    Line(Line),
    /// The outcome's word, and a sentence about it.
    Outcome(&'static str, String),
    /// Sentences.
    List(Vec<String>),
    /// Names and what they are.
    Pairs(Vec<(&'static str, String)>),
    /// A table.
    Table(Table),
    /// The drawing; texts go without.
    Drawing,
    /// The working of a check.
    Working(Vec<WorkLine>),
    /// Lines left blank to be written on.
    Blanks(Vec<&'static str>),
}

/// A table.
#[derive(Clone, Debug)]
pub(super) struct Table {
    /// What it shows.
    pub caption: String,
    /// The columns' names, and whether they hold numbers.
    pub head: Vec<(Line, bool)>,
    /// Rows of as many cells.
    pub rows: Vec<Vec<String>>,
}

impl Table {
    /// An empty table; a column's name in code spelling after `$` is a symbol, `>` before it tells numbers.
    pub(super) fn new(caption: impl Into<String>, head: &[&str]) -> Self {
        let column = |name: &&str| {
            let (name, number) = name.strip_prefix('>').map_or((*name, false), |rest| (rest, true));
            let Some((before, symbol)) = name.split_once('$') else { return (text(name), number) };
            let (symbol, unit) = symbol.split_once(' ').unwrap_or((symbol, ""));
            let pieces = [Piece::Text(before.into()), Piece::Symbol(symbol.into()), Piece::Text(format!(" {unit}"))];
            (pieces.into_iter().filter(|p| !matches!(p, Piece::Text(t) if t.trim().is_empty())).collect(), number)
        };
        Self { caption: caption.into(), head: head.iter().map(column).collect(), rows: Vec::new() }
    }
}

/// A section; level 2 is numbered, level 3 stands inside one.
#[derive(Clone, Debug)]
pub(super) struct Section {
    pub level: u8,
    pub heading: String,
    pub blocks: Vec<Block>,
}

/// One joint's sheet.
#[derive(Clone, Debug)]
pub(super) struct Sheet {
    pub title: String,
    pub head: Vec<Block>,
    pub sections: Vec<Section>,
}

/// The sheet of a joint.
pub(super) fn sheet(review: &Review, joint: &JointReview) -> Sheet {
    let common =
        [("gamma_M0", review.basis.gamma_m0), ("gamma_M1", review.basis.gamma_m1), ("gamma_M2", review.basis.gamma_m2)];
    let mut sections: Vec<Section> = Vec::new();
    let mut add = |heading: &str, blocks: Vec<Block>| {
        let number = sections.iter().filter(|section| section.level == 2).count() + 1;
        sections.push(Section { level: 2, heading: format!("{number} {heading}"), blocks });
        number
    };
    add("Outcome", parts::outcome(review, joint));
    if let Some(sketch) = &joint.sketch {
        add("The joint as detailed", geometry::detailed(sketch));
    }
    if let Some((intended, detailed)) = &joint.difference {
        add("Intended and detailed", geometry::difference(joint, intended, detailed));
    }
    if !joint.inputs.is_empty() {
        add("Inputs and where they came from", vec![parts::inputs(review, joint)]);
    }
    if !joint.rows.is_empty() {
        add("Row forces", parts::rows(joint));
    }
    if !joint.checks.is_empty() {
        add("Checks", parts::checks(review, joint));
        let number = add("Working", vec![Block::Line(text(parts::HOW_TO_READ))]);
        let mut earlier: Vec<(String, &Working)> = Vec::new();
        for (i, check) in joint.checks.iter().enumerate().filter(|(_, check)| !check.working.steps.is_empty()) {
            let called = format!("{number}.{}", i + 1);
            let lines = working::lines(&check.working, &earlier, &common);
            sections.push(Section {
                level: 3,
                heading: format!("{called} {}", check.title),
                blocks: vec![parts::result(joint, check), Block::Working(lines)],
            });
            earlier.push((called, &check.working));
        }
    }
    let mut add = |heading: &str, blocks: Vec<Block>| {
        let number = sections.iter().filter(|section| section.level == 2).count() + 1;
        sections.push(Section { level: 2, heading: format!("{number} {heading}"), blocks });
    };
    if let Some(result) = &joint.stiffness {
        add("Rotational stiffness and class", parts::stiffness(result, &common));
    }
    add("Findings", parts::findings(review, joint));
    add("Unproven, and what to ask", parts::unproven(review, joint));
    add("Assumptions", parts::assumptions(joint));
    add("For the record", parts::record());
    Sheet { title: format!("Calculation sheet, joint {}", joint.mark), head: parts::head(review, joint), sections }
}

/// Whether a check is what governs the joint.
pub(super) fn governs(joint: &JointReview, check: &CheckResult) -> bool {
    group::governing(joint).is_some_and(|governing| *governing == check.title)
}
