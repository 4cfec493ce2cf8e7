use super::bench::{Bench, check, rows};
use faying::assess::State;

const ID: &str = "bolt-count-differs";

fn spoil(bench: &mut Bench) {
    bench.layout().bolts.rows = rows(&[560.0, 440.0, 350.0, 260.0, 60.0]);
}

#[test]
fn more_bolts_are_a_comment() {
    let expected = "comment | there are 10 bolts instead of the intended 8 | 8 bolts, rows at 560, 440, 350, 60 mm | \
                    10 bolts, rows at 560, 440, 350, 260, 60 mm";
    for state in [State::Met, State::NotMet, State::Unproven] {
        check(ID, |b| (spoil(b), b.carries(state)).1, &[expected]);
    }
    check("row-moved", spoil, &[]);
    check("row-missing", spoil, &[]);
}

#[test]
fn as_many_as_intended_or_none_intended() {
    check(ID, |_| (), &[]);
    check(ID, |b| (spoil(b), b.intended().rows = None).1, &[]);
}
