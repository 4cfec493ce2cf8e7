//! What the rulebook says of a text, looked up once: parts by the thousand bear the same names.

use std::cell::OnceCell;
use std::rc::Rc;

use super::bolt_name::size_in;
use super::reading::Reading;
use crate::rulebook::{Grade, Rulebook, Section, Words};

/// Texts that are kept at most; parts with names of their own must not fill the memory.
const KEPT: usize = 1 << 14;

/// A text with what was asked of it.
pub(super) struct Text<'a> {
    text: Box<str>,
    rulebook: &'a Rulebook,
    words: OnceCell<Words>,
    section: OnceCell<Option<&'a Section>>,
    grade: OnceCell<Option<Grade>>,
    class: OnceCell<Option<String>>,
    size: OnceCell<Option<(f64, Option<f64>)>>,
}

impl<'a> Text<'a> {
    /// Its words.
    pub fn words(&self) -> &Words {
        self.words.get_or_init(|| self.rulebook.words_of(&self.text))
    }

    /// The section that it names.
    pub fn section(&self) -> Option<&'a Section> {
        *self.section.get_or_init(|| self.rulebook.section(&self.text))
    }

    /// The steel grade that it names.
    pub fn grade(&self) -> Option<Grade> {
        self.grade.get_or_init(|| self.rulebook.grade(&self.text)).clone()
    }

    /// The bolt class that it names.
    pub fn class(&self) -> Option<String> {
        self.class.get_or_init(|| self.rulebook.class_in(&self.text)).clone()
    }

    /// The diameter and length of a bolt that it states.
    pub fn size(&self) -> Option<(f64, Option<f64>)> {
        *self.size.get_or_init(|| size_in(&self.text))
    }
}

impl<'a> Reading<'a> {
    /// A text, to be asked.
    pub fn text(&self, text: &str) -> Rc<Text<'a>> {
        let mut texts = self.texts.borrow_mut();
        if let Some(known) = texts.get(text) {
            return known.clone();
        }
        if texts.len() >= KEPT {
            texts.clear();
        }
        let new = Rc::new(Text {
            text: text.into(),
            rulebook: self.rulebook,
            words: OnceCell::new(),
            section: OnceCell::new(),
            grade: OnceCell::new(),
            class: OnceCell::new(),
            size: OnceCell::new(),
        });
        texts.insert(text.into(), new.clone());
        new
    }

    /// Whether a text stands for a concept of the vocabulary.
    pub fn means(&self, concept: &str, text: &str) -> bool {
        self.text(text).words().means(concept)
    }

    /// Whether a text holds a word of a concept.
    pub fn says(&self, concept: &str, text: &str) -> bool {
        self.text(text).words().says(concept)
    }
}
