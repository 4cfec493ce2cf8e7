//! How a joint stands in the frame: the words and units of span, bracing and class in a schedule.

use super::actions::BETWEEN;
use super::source::{fold, given};
use super::{InFrame, JointClass};
use crate::units::mm;

/// What a schedule may say of a joint in its frame.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Word {
    Braced,
    Class,
}

impl Word {
    /// Its key and first heading.
    pub fn key(self) -> &'static str {
        match self {
            Self::Braced => "frame",
            Self::Class => "class",
        }
    }

    fn allowed(self) -> &'static [&'static str] {
        match self {
            Self::Braced => &["braced", "unbraced"],
            Self::Class => &["rigid", "semi-rigid", "pinned"],
        }
    }

    /// The word as it is kept, or what is allowed instead.
    pub fn read(self, text: &str) -> Result<&'static str, String> {
        let plain = |word: &str| word.chars().filter(|c| c.is_alphanumeric()).collect::<String>().to_lowercase();
        let found = self.allowed().iter().find(|word| plain(word) == plain(text));
        found
            .copied()
            .ok_or_else(|| format!("{}: given {}; allowed are {}", self.key(), given(text), self.allowed().join(", ")))
    }
}

/// Units of a span with their size in mm.
const UNITS: &[(&str, f64)] = &[("m", 1e3), ("mm", 1.0)];

/// What the unit of a span is in mm; `None` if the heading names no span, `Err` if its unit is missing or not known.
pub(super) fn span(heading: &str) -> Option<Result<f64, String>> {
    let heading = heading.trim_matches(BETWEEN);
    let rest = ["beam span", "beam_span", "span"].iter().find_map(|word| {
        heading.get(..word.len()).filter(|start| start.eq_ignore_ascii_case(word)).and(heading.get(word.len()..))
    })?;
    if rest.starts_with(char::is_alphanumeric) {
        return None;
    }
    let unit = rest.trim_matches(BETWEEN).trim_start_matches('/').trim_matches(BETWEEN);
    let known = UNITS.iter().find(|(name, _)| *name == unit);
    Some(known.map(|(_, size)| *size).ok_or_else(|| {
        let what = if unit.is_empty() { "no unit".into() } else { format!("the unit {}", given(unit)) };
        format!("span has {what}; allowed are m, mm")
    }))
}

/// From what the lines of a joint agree on: a span in mm, and words as [`Word::read`] keeps them.
pub(super) fn in_frame(span: Option<String>, braced: Option<String>, class: Option<String>) -> InFrame {
    let class = class.map(|word| fold(&word));
    InFrame {
        span: span.and_then(|text| text.trim_end_matches(" mm").parse().ok()).map(mm),
        braced: braced.map(|word| word == "braced"),
        class: class.and_then(|word| JointClass::ALL.into_iter().find(|class| fold(class.word()) == word)),
    }
}
