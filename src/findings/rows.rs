//! Which detailed bolt row is which intended one, and whether the joint was detailed upside down.

use super::compare::differs;
use super::context::Context;
use crate::units::Length;

/// Intended and detailed rows laid on each other; all indices count from the top, from 0.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct RowMatch {
    /// Intended row, detailed row.
    pub pairs: Vec<(usize, usize)>,
    /// Intended rows that are absent.
    pub missing: Vec<usize>,
    /// Detailed rows that nobody intended.
    pub extra: Vec<usize>,
}

/// Beyond this many rows (no joint has them) they are simply paired from the top.
const ROWS_MAX: usize = 100;
/// Moving one row explains more than striking one out and adding another...
const MOVED: f64 = 1.0;
/// ... but striking out one and adding one explains more than moving two.
const STRUCK: f64 = 0.75;

/// Lays rows on each other in order from the top, by the fewest changes, then by the shortest way.
///
/// Heights in mm above the soffit, top down. A row within the tolerance of its partner costs nothing. A joint that lacks
/// its top row and has one more row below thus reads as "one missing", not as "all moved".
pub fn match_rows(intended: &[Length], detailed: &[Length], tolerance: Length) -> RowMatch {
    let (m, n) = (intended.len(), detailed.len());
    if m > ROWS_MAX || n > ROWS_MAX {
        let paired = m.min(n);
        return RowMatch {
            pairs: (0..paired).map(|i| (i, i)).collect(),
            missing: (paired..m).collect(),
            extra: (paired..n).collect(),
        };
    }
    let pairing = |i: usize, j: usize| match differs(intended[i], detailed[j], tolerance) {
        false => 0.0,
        true => MOVED + 1e-6 * (intended[i] - detailed[j]).abs().get().min(1e4),
    };
    // cost[i][j]: of laying intended[i..] on detailed[j..].
    let mut cost = vec![vec![0.0_f64; n + 1]; m + 1];
    for i in (0..=m).rev() {
        for j in (0..=n).rev() {
            cost[i][j] = match (i < m, j < n) {
                (true, true) => {
                    (pairing(i, j) + cost[i + 1][j + 1]).min(STRUCK + cost[i + 1][j]).min(STRUCK + cost[i][j + 1])
                }
                _ => STRUCK * (m - i + n - j) as f64,
            };
        }
    }
    let mut matched = RowMatch::default();
    let (mut i, mut j) = (0, 0);
    while i < m && j < n {
        if pairing(i, j) + cost[i + 1][j + 1] <= cost[i][j] {
            matched.pairs.push((i, j));
            (i, j) = (i + 1, j + 1);
        } else if STRUCK + cost[i + 1][j] <= cost[i][j] {
            matched.missing.push(i);
            i += 1;
        } else {
            matched.extra.push(j);
            j += 1;
        }
    }
    matched.missing.extend(i..m);
    matched.extra.extend(j..n);
    matched
}

/// Intended heights, detailed heights (both top down) and how they lie on each other; a joint that was detailed upside
/// down is first turned back, so that only what deviates besides is told.
pub(super) fn rows_of(context: &Context<'_>) -> Option<(Vec<Length>, Vec<Length>, RowMatch)> {
    let (layout, intended) = context.both()?;
    let intended = top_down(intended.rows.as_ref()?.iter().copied());
    let detailed = top_down(layout.bolts().rows.iter().map(|row| row.height));
    let turned = match &layout.side().beam.section {
        Ok(section) if upside_down(context) => turned(&detailed, section.value.h),
        _ => detailed.clone(),
    };
    let matched = match_rows(&intended, &turned, context.rulebook.tolerances.position);
    Some((intended, detailed, matched))
}

/// Whether the joint is the intended one turned upside down.
///
/// The rows decide, where they are stated: more of them beyond the other flange than intended, or all of them where the
/// mirror image of the intended ones is. Only without rows does the plate decide: it reaches further past the other
/// flange, and the mirror image fits better (a plate that merely lost its extension fits neither way better).
pub(super) fn upside_down(context: &Context<'_>) -> bool {
    let Some((layout, intended)) = context.both() else { return false };
    let Ok(section) = &layout.side().beam.section else { return false };
    let h = section.value.h;
    let named = intended.supported_section.as_ref().and_then(|name| context.rulebook.section(name));
    let h_intended = named.map_or(h, |named| named.h);
    let tolerance = context.rulebook.tolerances.position;
    if let Some(rows) = &intended.rows {
        let intended = top_down(rows.iter().copied());
        let detailed = top_down(layout.bolts().rows.iter().map(|row| row.height));
        return beyond(&intended, h_intended) * beyond(&detailed, h) < 0
            || (!all_at(&intended, &detailed, tolerance) && all_at(&intended, &turned(&detailed, h), tolerance));
    }
    let (Some(top), Some(bottom)) = (intended.plate_top, intended.plate_bottom) else { return false };
    let plate = layout.side().plate;
    let lean_intended = top + bottom - h_intended;
    let lean_detailed = plate.top + plate.bottom - h;
    let apart = |upper: Length, lower: Length| (top - upper).abs() + (bottom - lower).abs();
    lean_intended.abs() > tolerance
        && lean_detailed.abs() > tolerance
        && apart(h - plate.bottom, h - plate.top) < apart(plate.top, plate.bottom)
}

/// Rows above the upper flange less rows below the soffit.
fn beyond(rows: &[Length], h: Length) -> i64 {
    let count = |of: &dyn Fn(&Length) -> bool| rows.iter().filter(|row| of(row)).count() as i64;
    count(&|row| *row > h) - count(&|row| *row < Length::ZERO)
}

fn all_at(a: &[Length], b: &[Length], tolerance: Length) -> bool {
    a.len() == b.len() && a.iter().zip(b).all(|(a, b)| !differs(*a, *b, tolerance))
}

fn turned(rows: &[Length], h: Length) -> Vec<Length> {
    rows.iter().rev().map(|row| h - *row).collect()
}

fn top_down(rows: impl Iterator<Item = Length>) -> Vec<Length> {
    let mut rows: Vec<Length> = rows.collect();
    rows.sort_by(|a, b| b.get().total_cmp(&a.get()));
    rows
}
