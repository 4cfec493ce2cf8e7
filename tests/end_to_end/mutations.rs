//! Damaged exchanges: never a panic, never long, and never clear by a deletion what was proven not to carry.

use std::sync::LazyLock;
use std::time::{Duration, Instant};

use faying::review::Outcome::{Clear, Comment, Hold};
use proptest::prelude::*;

use super::bench::{SCHEDULE, j1, joint, plain, review, shed};

/// The shed with an end plate of 8 mm at J1, which is far too thin for 150 kNm; J2 is clear.
static WEAK: LazyLock<String> = LazyLock::new(|| {
    let mut building = shed();
    j1(&mut building).plate.thickness = 8.0;
    plain(&building)
});

/// Byte ranges: from, to.
type Pieces = Vec<(usize, usize)>;

/// Byte ranges of all elements of the exchange, from their start tags to the ends of their end tags, and of all
/// attributes; the writer puts each tag on a line of its own, or a whole element.
static PIECES: LazyLock<(Pieces, Pieces)> = LazyLock::new(|| {
    let text = WEAK.as_str();
    let mut elements = Vec::new();
    let mut attributes = Vec::new();
    let mut open: Vec<usize> = Vec::new();
    let mut at = 0;
    for line in text.split_inclusive('\n') {
        let tag = line.trim();
        if tag.starts_with("</") {
            let from = open.pop().expect("the writer closes what it opened");
            elements.push((from, at + line.len()));
        } else if tag.starts_with("<?") {
        } else if tag.ends_with("/>") || tag.contains("</") {
            elements.push((at, at + line.len()));
        } else {
            open.push(at);
        }
        for (found, _) in line.match_indices("=\"") {
            let from = line[..found].rfind(' ').expect("a space before an attribute");
            let to = found + 2 + line[found + 2..].find('"').expect("a closing quote") + 1;
            attributes.push((at + from, at + to));
        }
        at += line.len();
    }
    // The last one is the document.
    elements.pop();
    (elements, attributes)
});

/// More than a debug build on a busy machine needs by far; a quadratic walk would need longer.
const LONG: Duration = Duration::from_secs(10);

fn survived(bytes: &[u8]) -> Option<faying::review::Review> {
    let start = Instant::now();
    let inputs = faying::run::Inputs {
        model: ("model.ifcxml", bytes),
        schedules: vec![("schedule.toml", SCHEDULE.as_bytes())],
        rules: Vec::new(),
    };
    let review = faying::run::run(&inputs).ok();
    if let Some(review) = &review {
        let options = faying::report::Options::default();
        faying::report::text::render(review, &options, Some(bytes));
        faying::report::survey::render(review, &options);
        faying::report::json::review(review).expect("every review is written");
    }
    assert!(start.elapsed() < LONG, "{:?}", start.elapsed());
    review
}

#[test]
fn the_weak_joint_is_held() {
    let review = review(&WEAK, Some(SCHEDULE)).expect("a review");
    assert_eq!(joint(&review, "J1").map(|j| j.outcome), Some(Hold));
    assert_eq!(joint(&review, "J2").map(|j| j.outcome), Some(Clear));
    assert!(PIECES.0.len() > 1000 && PIECES.1.len() > 1000, "{} {}", PIECES.0.len(), PIECES.1.len());
}

fn without(pieces: &[(usize, usize)]) -> String {
    let mut text = WEAK.clone();
    let mut pieces = pieces.to_vec();
    pieces.sort_unstable();
    for (from, to) in pieces.into_iter().rev() {
        // One piece may lie within another.
        let to = to.min(text.len());
        if from < to {
            text.replace_range(from..to, "");
        }
    }
    text
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 48, ..ProptestConfig::default() })]

    /// Whatever an exchange no longer says can't prove that the joint carries: what thin plates resist does not grow
    /// by silence. (Of contradicting statements one may be deleted, and the other stands; here nothing contradicts.)
    #[test]
    fn no_deletion_makes_the_weak_joint_carry(
        elements in proptest::collection::vec(any::<prop::sample::Index>(), 0..3),
        attributes in proptest::collection::vec(any::<prop::sample::Index>(), 0..3),
    ) {
        let mut gone: Vec<(usize, usize)> = elements.iter().map(|index| *index.get(&PIECES.0)).collect();
        gone.extend(attributes.iter().map(|index| *index.get(&PIECES.1)));
        if let Some(review) = survived(without(&gone).as_bytes()) {
            let end = joint(&review, "J1").map(|j| j.outcome);
            prop_assert!(!matches!(end, Some(Clear | Comment)), "{end:?} without {:?}",
                gone.iter().map(|(from, to)| &WEAK[*from..*to]).collect::<Vec<_>>());
        }
    }

    #[test]
    fn no_damage_panics_or_takes_long(
        damage in proptest::collection::vec((any::<prop::sample::Index>(), any::<u8>(), 0usize..30), 1..6),
    ) {
        let mut bytes = WEAK.clone().into_bytes();
        for (at, byte, cut) in damage {
            let at = at.index(bytes.len());
            match cut {
                0..10 => bytes[at] = byte,
                10..20 => bytes[at] ^= 1 << (byte % 8),
                cut => drop(bytes.drain(at..(at + cut).min(bytes.len()))),
            }
        }
        survived(&bytes);
    }

    #[test]
    fn a_beginning_is_no_exchange(end in any::<prop::sample::Index>()) {
        // The document's own end tag is the last line.
        let whole = WEAK.trim_end().len();
        let cut = &WEAK.as_bytes()[..end.index(whole)];
        prop_assert!(survived(cut).is_none());
    }
}
