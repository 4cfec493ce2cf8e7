//! Loads `rules/` (embedded, a folder may override single files); nothing else reads it.

mod bolts;
mod catalogue;
mod distances;
mod error;
mod load;
mod names;
mod section;
mod simple;
mod steel;
mod tables;
mod vocabulary;

use std::collections::BTreeMap;
use std::sync::OnceLock;

pub use error::RuleError;
pub use tables::{
    Alpha, Annex, BoltClass, BoltSize, Category, Clearance, Distances, Grade, ModeOne, RowForces, Section, Settings,
    SimpleRules, SlipRules, Strength, Tolerances, WeldRules,
};

use crate::origin::Known;
use crate::units::Length;
use bolts::Bolts;
use catalogue::Catalogue;
use load::{EMBEDDED, RuleFile};
use steel::Steel;
use vocabulary::Vocabulary;
pub use vocabulary::Words;

/// Everything under `rules/`.
#[derive(Clone, Debug)]
pub struct Rulebook {
    /// Partial factors.
    pub annex: Annex,
    /// Readings and assumptions.
    pub settings: Settings,
    /// Tolerances.
    pub tolerances: Tolerances,
    /// Bolt sizes by diameter.
    pub bolt_sizes: Vec<BoltSize>,
    /// Bolt classes.
    pub bolt_classes: Vec<BoltClass>,
    /// α_v with the shank in the shear plane, whatever the class; EN 1993-1-8:2005 Table 3.4.
    pub alpha_v_shank: f64,
    /// Hole clearances by bolt diameter.
    pub clearances: Vec<Clearance>,
    /// Slip of preloaded bolts.
    pub slip: SlipRules,
    /// Distances and room of bolts.
    pub distances: Distances,
    /// Factors of joints that carry shear.
    pub simple: SimpleRules,
    /// Rules for fillet welds.
    pub welds: WeldRules,
    annexes: Vec<(String, Annex)>,
    steel: Steel,
    catalogue: Catalogue,
    vocabulary: Vocabulary,
}

impl Rulebook {
    /// The rules as the program carries them.
    ///
    /// # Panics
    /// If the embedded files are not valid; they are part of the program, and a test loads them.
    pub fn embedded() -> Self {
        static RULES: OnceLock<Rulebook> = OnceLock::new();
        let load = || Self::with_overrides::<&str, &str>(&[]).expect("the embedded rule files are valid");
        RULES.get_or_init(load).clone()
    }

    /// The embedded rules, with the given files (name inside the rule folder with `/`, text) in place of those of the
    /// same name; the words of a `vocabulary.toml` come beside the embedded ones instead. New files may come under
    /// `annexes/` and `sections/`.
    ///
    /// # Errors
    /// [`RuleError`] with the file and the place: unknown file, unknown or missing key, value out of its range.
    pub fn with_overrides<N: AsRef<str>, T: AsRef<str>>(files: &[(N, T)]) -> Result<Self, RuleError> {
        let mut all: BTreeMap<&str, &str> = EMBEDDED.iter().copied().collect();
        for (name, text) in files {
            let (name, text) = (name.as_ref(), text.as_ref().trim_start_matches('\u{feff}'));
            let new = [("annexes/", ".toml"), ("sections/", ".csv")];
            let allowed = |(folder, ending): &(&str, &str)| {
                let stem = name.strip_prefix(folder).and_then(|rest| rest.strip_suffix(ending));
                stem.is_some_and(|stem| !stem.is_empty() && !stem.contains('/'))
            };
            if !all.contains_key(name) && !new.iter().any(allowed) {
                let names: Vec<_> = EMBEDDED.iter().map(|(name, _)| *name).filter(|name| !name.contains('/')).collect();
                let message =
                    format!("no such rule file; allowed is {}, annexes/*.toml, sections/*.csv", names.join(", "));
                return Err(RuleError::new(name, text, None, message));
            }
            all.insert(name, text);
        }
        Self::load(&all)
    }

    fn load(files: &BTreeMap<&str, &str>) -> Result<Self, RuleError> {
        // Every name asked for is in EMBEDDED, so an empty text never comes to be read.
        let file = |name: &'static str| RuleFile { name, text: files.get(name).copied().unwrap_or_default() };
        let of = |folder: &'static str| {
            files.iter().filter(move |(name, _)| name.starts_with(folder)).map(|(name, text)| RuleFile { name, text })
        };
        let (settings, chosen) = file("detailing.toml").settings()?;
        let mut annexes = Vec::new();
        for annex in of("annexes/") {
            let id = annex.name.trim_start_matches("annexes/").trim_end_matches(".toml").to_owned();
            annexes.push((id, annex.annex()?));
        }
        let Some((_, annex)) = annexes.iter().find(|(id, _)| id == chosen.get_ref()) else {
            let ids: Vec<_> = annexes.iter().map(|(id, _)| format!("\"{id}\"")).collect();
            let message = format!("annex = \"{}\"; allowed is {}", chosen.get_ref(), ids.join(", "));
            return Err(file("detailing.toml").error(&chosen, message));
        };
        let mut catalogue = Catalogue::default();
        for sections in of("sections/") {
            catalogue.add(sections)?;
        }
        let bolts = Bolts::load(file("bolts.toml"))?;
        let own =
            EMBEDDED.iter().find(|(name, _)| *name == "vocabulary.toml").map(|(_, text)| *text).unwrap_or_default();
        let mut vocabulary = Vocabulary::load(RuleFile { name: "vocabulary.toml", text: own })?;
        vocabulary.add(file("vocabulary.toml"))?;
        let settings = by_annex(settings, annex);
        Ok(Self {
            annex: annex.clone(),
            settings,
            tolerances: file("tolerances.toml").tolerances()?,
            bolt_sizes: bolts.sizes,
            bolt_classes: bolts.classes,
            alpha_v_shank: bolts.alpha_v_shank,
            clearances: bolts.clearances,
            slip: bolts.slip,
            distances: file("distances.toml").distances()?,
            simple: file("simple.toml").simple()?,
            welds: file("welds.toml").welds()?,
            annexes,
            steel: Steel::load(file("steel.toml"))?,
            catalogue,
            vocabulary,
        })
    }

    /// The annexes there are: the names by which [`Rulebook::use_annex`] and `detailing.toml` choose.
    pub fn annexes(&self) -> impl Iterator<Item = &str> {
        self.annexes.iter().map(|(id, _)| id.as_str())
    }

    /// Takes the partial factors of another annex, and what it chooses where the settings leave that to the annex.
    ///
    /// # Errors
    /// A sentence with the annexes there are.
    pub fn use_annex(&mut self, id: &str) -> Result<(), String> {
        let Some((_, annex)) = self.annexes.iter().find(|(known, _)| known == id) else {
            let known: Vec<_> = self.annexes().collect();
            return Err(format!("annex \"{id}\"; allowed is {}", known.join(", ")));
        };
        self.annex = annex.clone();
        self.settings = by_annex(self.settings.clone(), &self.annex);
        Ok(())
    }

    /// The catalogue section of that name in any of its usual spellings, also inside a longer name that holds just
    /// this one designation; `None` where the name holds none, two, or one of another family or series.
    ///
    /// Its properties are computed from its sizes ([`Section::from_sizes`]), not taken from the printed table.
    pub fn section(&self, name: &str) -> Option<&Section> {
        self.catalogue.find(name).map(|(section, _)| section)
    }

    /// The table and edition that a catalogue section's sizes come from: "EN 10365:2017".
    pub fn section_source(&self, name: &str) -> Option<&str> {
        self.catalogue.find(name).map(|(_, source)| source.as_str())
    }

    /// Every catalogue section, in a fixed order.
    pub fn sections(&self) -> impl Iterator<Item = &Section> {
        self.catalogue.all().map(|(section, _)| section)
    }

    /// The grade that a material string names: `S355JR`, `STEEL/S235JR`, `S 235 JR`, `S355JO`, `1.0577`, `St 52-3`;
    /// `None` where it names none, or two that differ.
    pub fn grade(&self, text: &str) -> Option<Grade> {
        self.steel.grade(text).map(|(grade, _)| grade)
    }

    /// Where [`Rulebook::grade`] reads an old or other name: which one, as what, and on whose word.
    pub fn grade_note(&self, text: &str) -> Option<String> {
        self.steel.grade(text).and_then(|(_, note)| note)
    }

    /// f_y and f_u of a grade at a thickness (the table's edition in the origin).
    ///
    /// # Errors
    /// [`Missing`](crate::origin::Missing) if the grade or the thickness is outside the table.
    pub fn strength(&self, grade: &Grade, thickness: Length) -> Known<Strength> {
        self.steel.strength(grade, thickness)
    }

    /// The name of the strength table in use.
    pub fn steel_table(&self) -> &str {
        &self.steel.table
    }

    /// β_w of a grade, EN 1993-1-8 Table 4.1.
    pub fn beta_w(&self, grade: &Grade) -> Option<f64> {
        self.welds.beta_w.get(&grade.0).copied()
    }

    /// The bolt size of a nominal diameter.
    pub fn bolt_size(&self, d: Length) -> Option<&BoltSize> {
        self.bolt_sizes.iter().find(|size| (size.d - d).abs().get() < 0.05)
    }

    /// The hole clearances of a bolt diameter.
    pub fn clearance(&self, d: Length) -> Option<&Clearance> {
        self.clearances.iter().find(|clearance| d <= clearance.up_to)
    }

    /// The bolt class of that name.
    pub fn bolt_class(&self, name: &str) -> Option<&BoltClass> {
        self.bolt_classes.iter().find(|class| class.name == name)
    }

    /// The bolt class that a text names: `M20 x 60 8.8`, `10.9 HV`, `8,8`; `None` where it names none or two.
    pub fn class_in(&self, text: &str) -> Option<String> {
        let mut named = names::bare_numbers(text);
        named.retain(|number| self.bolt_class(number).is_some());
        named.dedup();
        if named.len() == 1 { named.pop() } else { None }
    }

    /// Whether a word (a property's name, a column's heading) stands for a concept, without regard to case, spaces,
    /// punctuation and diacritics. Concepts: the keys of `vocabulary.toml`; any other has no words.
    pub fn means(&self, concept: &str, word: &str) -> bool {
        self.vocabulary.read(word).means(concept)
    }

    /// Whether a text (a part's name) holds a word of a concept as a word of its own: "M20 anchor bolt" an "anchor".
    pub fn says(&self, concept: &str, text: &str) -> bool {
        self.vocabulary.read(text).says(concept)
    }

    /// Whether a text is nothing but words of some concepts, and numbers: "Fillet weld 12".
    pub fn says_only(&self, concepts: &[&str], text: &str) -> bool {
        self.vocabulary.read(text).says_only(concepts)
    }

    /// What a text says, to be asked for many concepts.
    pub fn words_of(&self, text: &str) -> Words {
        self.vocabulary.read(text)
    }

    /// The words of a concept, normalised and sorted.
    pub fn vocabulary(&self, concept: &str) -> impl Iterator<Item = &str> {
        self.vocabulary.words(concept)
    }
}

/// The settings with what the annex chooses.
fn by_annex(settings: Settings, annex: &Annex) -> Settings {
    let row_forces = match settings.row_forces_by_annex {
        true => annex.row_forces.unwrap_or(RowForces::LinearBeyond19),
        false => settings.row_forces,
    };
    Settings { row_forces, ..settings }
}
