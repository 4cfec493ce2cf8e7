//! How intended and detailed rows are laid on each other.

use faying::findings::{RowMatch, match_rows};
use faying::units::mm;
use proptest::prelude::*;

use super::bench::lengths;

const TOLERANCE: f64 = 2.0;

fn matched(intended: &[f64], detailed: &[f64]) -> RowMatch {
    match_rows(&lengths(intended), &lengths(detailed), mm(TOLERANCE))
}

/// Intended, detailed; pairs, missing, extra.
type Case = (&'static [f64], &'static [f64], &'static [(usize, usize)], &'static [usize], &'static [usize]);

#[test]
fn the_fewest_changes_then_the_shortest_way() {
    let cases: [Case; 7] = [
        (&[500.0, 400.0, 50.0], &[500.0, 400.0, 50.0], &[(0, 0), (1, 1), (2, 2)], &[], &[]),
        (&[500.0, 400.0, 50.0], &[490.0, 390.0, 40.0], &[(0, 0), (1, 1), (2, 2)], &[], &[]),
        (&[500.0, 400.0, 50.0], &[400.0, 50.0], &[(1, 0), (2, 1)], &[0], &[]),
        (&[500.0, 400.0, 50.0], &[495.0, 50.0], &[(0, 0), (2, 1)], &[1], &[]),
        (&[500.0, 50.0], &[500.0, 300.0, 50.0], &[(0, 0), (1, 2)], &[], &[1]),
        (&[500.0, 400.0, 50.0], &[400.0, 300.0, 50.0], &[(1, 0), (2, 2)], &[0], &[1]),
        (&[], &[500.0], &[], &[], &[0]),
    ];
    for (intended, detailed, pairs, missing, extra) in cases {
        let expected = RowMatch { pairs: pairs.into(), missing: missing.into(), extra: extra.into() };
        assert_eq!(matched(intended, detailed), expected, "{intended:?} {detailed:?}");
    }
}

#[test]
fn a_senseless_number_of_rows_is_paired_from_the_top() {
    let many: Vec<f64> = (0..100_000).map(f64::from).rev().collect();
    let found = matched(&many, &many[1..]);
    assert_eq!((found.pairs.len(), found.missing.len()), (99_999, 1));
}

/// Rows from the top down, further apart than the tolerance.
fn heights() -> impl Strategy<Value = Vec<f64>> {
    prop::collection::btree_set(-20_i32..200, 1..8)
        .prop_map(|set| set.iter().rev().map(|h| f64::from(*h) * 5.0).collect())
}

proptest! {
    #[test]
    fn every_row_is_told_once_and_in_order(intended in heights(), detailed in heights()) {
        let found = matched(&intended, &detailed);
        let mut left: Vec<usize> = found.pairs.iter().map(|pair| pair.0).chain(found.missing.iter().copied()).collect();
        let mut right: Vec<usize> = found.pairs.iter().map(|pair| pair.1).chain(found.extra.iter().copied()).collect();
        prop_assert!(found.pairs.windows(2).all(|two| two[0].0 < two[1].0 && two[0].1 < two[1].1));
        left.sort_unstable();
        right.sort_unstable();
        prop_assert_eq!(left, (0..intended.len()).collect::<Vec<_>>());
        prop_assert_eq!(right, (0..detailed.len()).collect::<Vec<_>>());
    }

    #[test]
    fn the_row_that_was_taken_out_is_the_missing_one(intended in heights(), at in any::<prop::sample::Index>()) {
        let at = at.index(intended.len());
        let mut detailed = intended.clone();
        detailed.remove(at);
        let found = matched(&intended, &detailed);
        prop_assert_eq!(found.missing, vec![at]);
        prop_assert!(found.extra.is_empty());
    }

    #[test]
    fn noise_within_the_tolerance_changes_nothing(intended in heights(), noise in -1.9..1.9_f64) {
        let detailed: Vec<f64> = intended.iter().map(|height| height + noise).collect();
        prop_assert_eq!(matched(&intended, &detailed).pairs.len(), intended.len());
    }
}
