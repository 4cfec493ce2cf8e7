//! The words by which shop models and schedules call the things a joint needs.

use std::collections::{BTreeMap, BTreeSet};

use toml::Spanned;
use unicode_normalization::UnicodeNormalization;
use unicode_normalization::char::is_combining_mark;

use super::error::RuleError;
use super::load::RuleFile;

/// The concepts that have words: of properties and columns, then of parts.
pub(super) const CONCEPTS: [&str; 28] = [
    "mark",
    "bolt-diameter",
    "bolt-length",
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
}

impl Vocabulary {
    /// Reads the program's own words.
    pub fn load(file: RuleFile<'_>) -> Result<Self, RuleError> {
        let mut all = Self { words: BTreeMap::new() };
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
            let set = self.words.entry(concept.into_inner()).or_default();
            for word in &list {
                let plain = normalise(word.get_ref());
                if plain.is_empty() {
                    return Err(file.error(word, "a word without letters or digits; at least one is needed"));
                }
                set.insert(plain);
            }
        }
        Ok(())
    }

    pub fn means(&self, concept: &str, word: &str) -> bool {
        self.words.get(concept).is_some_and(|words| words.contains(&normalise(word)))
    }

    /// Whether a text holds a word of a concept, or several in a row that are one: "M20 anchor bolt".
    pub fn says(&self, concept: &str, text: &str) -> bool {
        let Some(known) = self.words.get(concept) else { return false };
        let tokens = tokens(text);
        (0..tokens.len()).any(|start| {
            let mut joined = String::new();
            tokens.iter().skip(start).take(JOINED).any(|token| {
                joined.push_str(token);
                known.contains(&joined)
            })
        })
    }

    /// Whether a text is nothing but words of some concepts, and numbers.
    pub fn says_only(&self, concepts: &[&str], text: &str) -> bool {
        let sets: Vec<_> = concepts.iter().filter_map(|concept| self.words.get(*concept)).collect();
        let tokens = tokens(text);
        !tokens.is_empty() && tokens.iter().all(|token| sets.iter().any(|words| words.contains(token)))
    }

    pub fn words(&self, concept: &str) -> impl Iterator<Item = &str> {
        self.words.get(concept).into_iter().flatten().map(String::as_str)
    }
}

/// Lower case letters and digits, without diacritics.
fn normalise(word: &str) -> String {
    word.nfkd().filter(|c| c.is_alphanumeric() && !is_combining_mark(*c)).flat_map(char::to_lowercase).collect()
}

/// The words of a text, normalised; numbers and signs part them.
fn tokens(text: &str) -> Vec<String> {
    let words = text.split(|c: char| !(c.is_alphabetic() || is_combining_mark(c)));
    words.map(normalise).filter(|word| !word.is_empty()).collect()
}
