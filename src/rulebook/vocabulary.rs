//! The words by which shop models and schedules call the things a joint needs.

use std::collections::{BTreeMap, BTreeSet};

use toml::Spanned;
use unicode_normalization::UnicodeNormalization;
use unicode_normalization::char::is_combining_mark;

use super::error::RuleError;
use super::load::RuleFile;

/// The concepts that have words: of properties and columns, then of parts.
pub(super) const CONCEPTS: [&str; 30] = [
    "mark",
    "bolt-diameter",
    "bolt-length",
    "thread-length",
    "bolt-class",
    "bolt-count",
    "nut-count",
    "washer-count",
    "hole-diameter",
    "slot-length",
    "weld-throat",
    "weld-leg",
    "weld-length",
    "grade",
    "section",
    "thickness",
    "bolt",
    "nut",
    "washer",
    "anchor",
    "stud",
    "screw",
    "countersunk",
    "weld",
    "butt-weld",
    "full-penetration",
    "fillet-weld",
    "plate",
    "stiffener",
    "no-steel",
];

/// A name's words are joined up to so many when a word of the vocabulary is looked for: "anchor bolt".
const JOINED: usize = 3;

/// Normalised words by concept.
#[derive(Clone, Debug)]
pub(super) struct Vocabulary {
    words: BTreeMap<String, BTreeSet<String>>,
    /// The concepts of each word, a bit each in the order of [`CONCEPTS`]. Only looked up, never walked.
    concepts: BTreeMap<String, u32>,
}

/// What a text says by the words of the vocabulary: looked up once, it can be asked for every concept.
#[derive(Clone, Debug)]
pub struct Words {
    /// Concepts that the text as a whole is a word of.
    means: u32,
    /// Concepts of which it holds a word.
    says: u32,
    /// Concepts of each of its words.
    each: Vec<u32>,
}

impl Words {
    /// Like [`Rulebook::means`](super::Rulebook::means).
    pub fn means(&self, concept: &str) -> bool {
        self.means & bit(concept) != 0
    }

    /// Like [`Rulebook::says`](super::Rulebook::says).
    pub fn says(&self, concept: &str) -> bool {
        self.says & bit(concept) != 0
    }

    /// Like [`Rulebook::says_only`](super::Rulebook::says_only).
    pub fn says_only(&self, concepts: &[&str]) -> bool {
        let wanted = concepts.iter().fold(0, |all, concept| all | bit(concept));
        !self.each.is_empty() && self.each.iter().all(|word| word & wanted != 0)
    }
}

/// The bit of a concept; none for what is no concept.
fn bit(concept: &str) -> u32 {
    CONCEPTS.iter().position(|known| *known == concept).map_or(0, |index| 1 << index)
}

impl Vocabulary {
    /// Reads the program's own words.
    pub fn load(file: RuleFile<'_>) -> Result<Self, RuleError> {
        let mut all = Self { words: BTreeMap::new(), concepts: BTreeMap::new() };
        all.add(file)?;
        match CONCEPTS.iter().find(|concept| !all.words.contains_key(**concept)) {
            Some(concept) => Err(RuleError::new(
                file.name,
                file.text,
                None,
                format!("no words for \"{concept}\"; a list is needed, it may be empty"),
            )),
            None => Ok(all),
        }
    }

    /// Adds the words of a file; it need not name every concept.
    pub fn add(&mut self, file: RuleFile<'_>) -> Result<(), RuleError> {
        let raw: BTreeMap<Spanned<String>, Vec<Spanned<String>>> = file.parse()?;
        for (concept, list) in raw {
            if !CONCEPTS.contains(&concept.get_ref().as_str()) {
                let message = format!("\"{}\" is no concept; allowed is {}", concept.get_ref(), CONCEPTS.join(", "));
                return Err(file.error(&concept, message));
            }
            let bit = bit(concept.get_ref());
            let set = self.words.entry(concept.into_inner()).or_default();
            for word in &list {
                let plain = normalise(word.get_ref());
                if plain.is_empty() {
                    return Err(file.error(word, "a word without letters or digits; at least one is needed"));
                }
                *self.concepts.entry(plain.clone()).or_default() |= bit;
                set.insert(plain);
            }
        }
        Ok(())
    }

    /// What a text says, several words in a row that are one included: "M20 anchor bolt".
    pub fn read(&self, text: &str) -> Words {
        let of = |word: &str| self.concepts.get(word).copied().unwrap_or_default();
        let tokens = tokens(text);
        let mut says = 0;
        for start in 0..tokens.len() {
            let mut joined = String::new();
            for token in tokens.iter().skip(start).take(JOINED) {
                joined.push_str(token);
                says |= of(&joined);
            }
        }
        Words { means: of(&normalise(text)), says, each: tokens.iter().map(|token| of(token)).collect() }
    }

    pub fn words(&self, concept: &str) -> impl Iterator<Item = &str> {
        self.words.get(concept).into_iter().flatten().map(String::as_str)
    }
}

/// Lower case letters and digits, without diacritics.
fn normalise(word: &str) -> String {
    if word.is_ascii() {
        return word.chars().filter(char::is_ascii_alphanumeric).map(|c| c.to_ascii_lowercase()).collect();
    }
    word.nfkd().filter(|c| c.is_alphanumeric() && !is_combining_mark(*c)).flat_map(char::to_lowercase).collect()
}

/// The words of a text, normalised; numbers and signs part them.
fn tokens(text: &str) -> Vec<String> {
    let words = text.split(|c: char| !(c.is_alphabetic() || (!c.is_ascii() && is_combining_mark(c))));
    words.map(normalise).filter(|word| !word.is_empty()).collect()
}
