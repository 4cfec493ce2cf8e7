//! Steel grades: strengths by thickness, and the names they go by.

use serde::Deserialize;
use toml::Spanned;

use super::error::RuleError;
use super::load::RuleFile;
use super::names::{self, Token};
use super::{Grade, Strength};
use crate::origin::{Datum, Known, Missing, Origin};
use crate::units::Length;

/// One thickness band; it starts where the one before ends.
#[derive(Clone, Debug)]
struct Band {
    up_to: Length,
    strength: Strength,
}

#[derive(Clone, Debug)]
struct Row {
    grade: String,
    source: String,
    bands: Vec<Band>,
}

#[derive(Clone, Debug)]
struct Alias {
    name: String,
    tokens: Vec<Token>,
    grade: String,
    source: String,
}

/// The strength table in use, and every grade that can be told by name.
#[derive(Clone, Debug)]
pub(super) struct Steel {
    pub table: String,
    thinnest: Length,
    rows: Vec<Row>,
    known: Vec<String>,
    aliases: Vec<Alias>,
}

impl Steel {
    pub fn load(file: RuleFile<'_>) -> Result<Self, RuleError> {
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct RawBand {
            up_to: Spanned<f64>,
            f_y: Spanned<f64>,
            f_u: Spanned<f64>,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct RawGrade {
            name: Spanned<String>,
            source: Option<Spanned<String>>,
            bands: Vec<RawBand>,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct RawTable {
            name: Spanned<String>,
            source: Spanned<String>,
            thinnest: Spanned<f64>,
            grade: Vec<RawGrade>,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct RawAlias {
            grade: Spanned<String>,
            names: Vec<Spanned<String>>,
            source: Spanned<String>,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct File {
            table: Spanned<String>,
            without_values: Vec<String>,
            tables: Vec<RawTable>,
            #[serde(default)]
            alias: Vec<RawAlias>,
        }

        let raw: File = file.parse()?;
        let mut known = raw.without_values;
        let mut chosen = None;
        for table in &raw.tables {
            let source = file.text("source", &table.source)?;
            let thinnest = file.length("thinnest", &table.thinnest)?;
            let mut rows: Vec<Row> = Vec::new();
            for grade in &table.grade {
                let name = file.text("name", &grade.name)?;
                if rows.iter().any(|row| row.grade == name) {
                    return Err(file.error(&grade.name, format!("{name} stands twice in this table; once is allowed")));
                }
                let mut bands: Vec<Band> = Vec::new();
                for band in &grade.bands {
                    let up_to = file.length("up_to", &band.up_to)?;
                    let (f_y, f_u) = (file.stress("f_y", &band.f_y)?, file.stress("f_u", &band.f_u)?);
                    if bands.last().map_or(thinnest, |last| last.up_to) >= up_to {
                        return Err(file.error(
                            &band.up_to,
                            format!("up_to = {up_to} does not rise; each band goes further than the last"),
                        ));
                    }
                    if f_y > f_u {
                        return Err(
                            file.error(&band.f_y, format!("f_y = {f_y} is above f_u = {f_u}; at most f_u is allowed"))
                        );
                    }
                    bands.push(Band { up_to, strength: Strength { f_y, f_u } });
                }
                if bands.is_empty() {
                    return Err(file.error(&grade.name, format!("{name} has no bands; at least one is needed")));
                }
                let source = grade.source.as_ref().map_or(Ok(source.clone()), |s| file.text("source", s))?;
                known.push(name.clone());
                rows.push(Row { grade: name, source, bands });
            }
            if table.name.get_ref() == raw.table.get_ref() {
                chosen = Some((thinnest, rows));
            }
        }
        let Some((thinnest, rows)) = chosen else {
            let names: Vec<_> = raw.tables.iter().map(|t| format!("\"{}\"", t.name.get_ref())).collect();
            let message = format!("table = \"{}\"; allowed is {}", raw.table.get_ref(), names.join(" or "));
            return Err(file.error(&raw.table, message));
        };
        known.sort();
        known.dedup();
        let mut aliases = Vec::new();
        for alias in &raw.alias {
            let (grade, source) = (file.text("grade", &alias.grade)?, file.text("source", &alias.source)?);
            if !known.contains(&grade) {
                return Err(
                    file.error(&alias.grade, format!("{grade} is in no table; allowed is {}", known.join(", ")))
                );
            }
            for name in &alias.names {
                let name = file.text("name", name)?;
                let tokens = names::tokens(&name);
                aliases.push(Alias { tokens, name, grade: grade.clone(), source: source.clone() });
            }
        }
        Ok(Self { table: raw.table.into_inner(), thinnest, rows, known, aliases })
    }

    /// The one grade that a text names, and a note where it does so by another name.
    pub fn grade(&self, text: &str) -> Option<(Grade, Option<String>)> {
        let tokens = names::tokens(text);
        let own = names::grades(&tokens).into_iter().map(|name| (name, None));
        let other = self.aliases.iter().filter(|alias| names::holds(&tokens, &alias.tokens)).map(|alias| {
            let note = format!("{} read as {}: {}", alias.name, alias.grade, alias.source);
            (alias.grade.clone(), Some(note))
        });
        let mut all = own.chain(other);
        let (grade, mut note) = all.next()?;
        for (another, its_note) in all {
            if another != grade {
                return None;
            }
            // The longest name is the one that was written: `St52-3`, not `St52`.
            if note.is_some() {
                note = its_note.or(note)
            }
        }
        // A family we have never heard of (`S355XY`) is kept if its number is a steel's: it is then in no table.
        let number: String = grade.chars().take(4).collect();
        self.known.iter().any(|name| name.starts_with(&number)).then_some((Grade(grade), note))
    }

    pub fn strength(&self, grade: &Grade, thickness: Length) -> Known<Strength> {
        let missing = |reason: String| Missing { what: "steel strength".into(), reason, at: None };
        let Some(row) = self.rows.iter().find(|row| row.grade == grade.0) else {
            return Err(missing(format!("{} is not in the table {}", grade.0, self.table)));
        };
        let limit = row.bands.last().map_or(Length::ZERO, |band| band.up_to);
        let band = row.bands.iter().position(|band| thickness <= band.up_to).filter(|_| thickness >= self.thinnest);
        let Some(band) = band else {
            let (from, given) = (self.thinnest.get(), thickness.get());
            let reason = format!("{} at {given} mm; {} goes from {from} to {} mm", grade.0, row.source, limit.get());
            return Err(missing(reason));
        };
        let lower =
            band.checked_sub(1).map(|below| format!("over {} ", row.bands[below].up_to.get())).unwrap_or_default();
        let range = format!("{lower}up to {} mm", row.bands[band].up_to.get());
        Ok(Datum::new(row.bands[band].strength, Origin::LookedUp(format!("{}: {}, {range}", row.source, grade.0))))
    }
}
