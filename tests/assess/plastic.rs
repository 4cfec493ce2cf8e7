//! A second way: the plastic moment resistance as a linear programme over all limits of rows, groups and compression.
//!
//! With F_r the row forces and S_r their sums from the tension side, every limit bounds a difference of two sums, so the
//! largest admissible sums are one solution, and lever arms that fall from row to row make it the best: the row by row
//! procedure of 6.2.7.2 is exact. Not so the rule of (9), which is no limit of that kind, nor a group that leaves a row
//! less than nothing; then it may only be lower.

use faying::assess::{MomentResistance, Sense};
use faying::rulebook::Rulebook;
use proptest::prelude::*;

use super::joint::{resistance, sketches};

/// max c·x with A x ≤ b, x ≥ 0, b ≥ 0: the simplex method on the full tableau with Bland's rule.
fn maximise(c: &[f64], a: &[Vec<f64>], b: &[f64]) -> f64 {
    let (n, m) = (c.len(), b.len());
    let mut rows: Vec<Vec<f64>> = (0..m)
        .map(|i| {
            let slack = (0..m).map(|j| f64::from(u8::from(i == j)));
            a[i].iter().copied().chain(slack).chain([b[i]]).collect()
        })
        .collect();
    let mut cost: Vec<f64> = c.iter().map(|c| -c).chain(vec![0.0; m + 1]).collect();
    let mut basis: Vec<usize> = (n..n + m).collect();
    for _ in 0..10_000 {
        let Some(enter) = (0..n + m).find(|&j| cost[j] < -1e-12) else { return cost[n + m] };
        let ratio = |i: usize| rows[i][n + m] / rows[i][enter];
        let leave = (0..m)
            .filter(|&i| rows[i][enter] > 1e-12)
            .min_by(|&i, &j| ratio(i).total_cmp(&ratio(j)).then(basis[i].cmp(&basis[j])))
            .expect("the programme is bounded");
        let pivot = rows[leave][enter];
        rows[leave].iter_mut().for_each(|v| *v /= pivot);
        basis[leave] = enter;
        let pivot_row = rows[leave].clone();
        let clear = |row: &mut Vec<f64>| {
            let factor = row[enter];
            row.iter_mut().zip(&pivot_row).for_each(|(v, p)| *v -= factor * p);
        };
        rows.iter_mut().enumerate().filter(|(i, _)| *i != leave).for_each(|(_, row)| clear(row));
        clear(&mut cost);
    }
    panic!("the simplex method did not end");
}

/// The rows that a component's title names: "…, rows 2-3 (mode 2)".
pub fn rows_of(title: &str) -> Option<(usize, usize)> {
    let tail = title.rsplit_once("rows ").or_else(|| title.rsplit_once("row "))?.1;
    let mut numbers = tail.split(|c: char| !c.is_ascii_digit()).filter_map(|n| n.parse().ok());
    let first = numbers.next()?;
    Some((first, if title.contains("rows ") { numbers.next()? } else { first }))
}

const OF_ROWS: [&str; 5] = [
    "column-flange-in-bending",
    "column-web-in-tension",
    "column-stiffener-in-tension",
    "end-plate-in-bending",
    "beam-web-in-tension",
];
const OF_ALL: [&str; 3] = ["column-web-panel-in-shear", "column-web-in-compression", "beam-flange-in-compression"];

/// In kN and m.
fn programme(moment: &MomentResistance) -> f64 {
    let arms: Vec<f64> = moment.rows.iter().map(|row| row.lever_arm.get() / 1e3).collect();
    let (mut a, mut b) = (Vec::new(), Vec::new());
    for c in &moment.components {
        let coefficients: Vec<f64> = if OF_ROWS.contains(&c.id.as_str()) {
            let (low, high) = rows_of(&c.title).unwrap_or_else(|| panic!("no rows in {}", c.title));
            moment.rows.iter().map(|row| f64::from(u8::from((low..=high).contains(&row.row)))).collect()
        } else if OF_ALL.contains(&c.id.as_str()) {
            let share = if c.id == "column-web-panel-in-shear" { moment.beta } else { 1.0 };
            vec![share; arms.len()]
        } else {
            continue;
        };
        a.push(coefficients);
        b.push(c.resistance.kn());
    }
    assert!(b.iter().all(|b| *b >= 0.0), "a negative limit: {b:?}");
    maximise(&arms, &a, &b)
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(400))]
    #[test]
    fn row_by_row_is_the_plastic_solution(sketch in sketches(), beta in 0.0..2.0f64) {
        let rulebook = Rulebook::embedded();
        let layout = sketch.layout(&rulebook);
        for sense in [Sense::Hogging, Sense::Sagging] {
            let Ok(moment) = resistance(&layout, sense, beta, &rulebook) else { continue };
            let (best, row_by_row) = (programme(&moment), moment.without_welds.knm());
            prop_assert!(row_by_row <= best * (1.0 + 1e-9) + 1e-9, "{row_by_row} above {best}: {:?}", moment.rows);
            if moment.notes.iter().all(|note| !note.contains("6.2.7.2(9)")) {
                prop_assert!(row_by_row >= best * (1.0 - 1e-9) - 1e-9, "{row_by_row} below {best}: {:?}", moment.rows);
            }
        }
    }
}

#[test]
fn the_simplex_method_finds_a_known_optimum() {
    // Own arithmetic: max 3x + 2y, x + y ≤ 4, x + 3y ≤ 6, x ≤ 3 has its optimum 11 at (3, 1).
    let best = maximise(&[3.0, 2.0], &[vec![1.0, 1.0], vec![1.0, 3.0], vec![1.0, 0.0]], &[4.0, 6.0, 3.0]);
    crate::close(best, 11.0, 1e-12);
}
