//! The words by which shop models and schedules call the things a joint needs.

use std::collections::{BTreeMap, BTreeSet};

use toml::Spanned;
use unicode_normalization::UnicodeNormalization;
use unicode_normalization::char::is_combining_mark;

use super::error::RuleError;
use super::load::RuleFile;

/// The concepts that have words.
pub(super) const CONCEPTS: [&str; 11] = [
    "mark",
    "bolt-diameter",
    "bolt-length",
    "bolt-class",
    "hole-diameter",
    "weld-throat",
    "weld-leg",
    "weld-length",
    "grade",
    "section",
    "thickness",
];

/// Normalised words by concept.
#[derive(Clone, Debug)]
pub(super) struct Vocabulary {
    words: BTreeMap<String, BTreeSet<String>>,
}

impl Vocabulary {
    pub fn load(file: RuleFile<'_>) -> Result<Self, RuleError> {
        let raw: BTreeMap<Spanned<String>, Vec<Spanned<String>>> = file.parse()?;
        let mut words: BTreeMap<String, BTreeSet<String>> = BTreeMap::new();
        for (concept, list) in raw {
            if !CONCEPTS.contains(&concept.get_ref().as_str()) {
                let message = format!("\"{}\" is no concept; allowed is {}", concept.get_ref(), CONCEPTS.join(", "));
                return Err(file.error(&concept, message));
            }
            let set = words.entry(concept.into_inner()).or_default();
            for word in &list {
                let plain = normalise(word.get_ref());
                if plain.is_empty() {
                    return Err(file.error(word, "a word without letters or digits; at least one is needed"));
                }
                set.insert(plain);
            }
        }
        match CONCEPTS.iter().find(|concept| !words.contains_key(**concept)) {
            Some(concept) => Err(RuleError::new(
                file.name,
                file.text,
                None,
                format!("no words for \"{concept}\"; a list is needed, it may be empty"),
            )),
            None => Ok(Self { words }),
        }
    }

    pub fn means(&self, concept: &str, word: &str) -> bool {
        self.words.get(concept).is_some_and(|words| words.contains(&normalise(word)))
    }

    pub fn words(&self, concept: &str) -> impl Iterator<Item = &str> {
        self.words.get(concept).into_iter().flatten().map(String::as_str)
    }
}

/// Lower case letters and digits, without diacritics.
fn normalise(word: &str) -> String {
    word.nfkd().filter(|c| c.is_alphanumeric() && !is_combining_mark(*c)).flat_map(char::to_lowercase).collect()
}
