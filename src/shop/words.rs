//! What parts are called, by the words of the vocabulary.

use super::reading::Reading;
use crate::exchange::Entity;

/// What a part of the hardware may be called.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Word {
    Anchor,
    Bolt,
    Nut,
    Washer,
    Stud,
    Screw,
}

impl Word {
    /// All, in the order in which they win within one name: a "bolt with nut" is a bolt.
    const ALL: [Self; 6] = [Self::Anchor, Self::Bolt, Self::Nut, Self::Washer, Self::Stud, Self::Screw];

    /// The vocabulary's concept.
    pub fn concept(self) -> &'static str {
        match self {
            Self::Anchor => "anchor",
            Self::Bolt => "bolt",
            Self::Nut => "nut",
            Self::Washer => "washer",
            Self::Stud => "stud",
            Self::Screw => "screw",
        }
    }
}

impl<'a> Reading<'a> {
    /// What the first of its names that says anything calls a part.
    pub fn called(&self, element: Entity<'a>) -> Option<Word> {
        let kin = self.kin(element);
        let first = || {
            kin.names.iter().find_map(|(_, text)| {
                let text = self.text(text);
                Word::ALL.into_iter().find(|word| text.words().says(word.concept()))
            })
        };
        *kin.called.get_or_init(first)
    }
}
