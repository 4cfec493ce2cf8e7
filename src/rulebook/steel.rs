//! Steel grades: strengths by thickness, and the names they go by.

use serde::Deserialize;
use toml::Spanned;

use super::error::RuleError;
use super::load::RuleFile;
use super::names::{self, Token};
use super::{Grade, Strength};
use crate::origin::{Ask, Datum, Known, Missing, Origin};
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
    /// The name of today, which may stand beside this one in a text.
    today: String,
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
            today: Option<Spanned<String>>,
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
            let today = alias.today.as_ref().map_or(Ok(grade.clone()), |name| file.text("today", name))?;
            for (name, place) in [(&grade, &alias.grade), (&today, alias.today.as_ref().unwrap_or(&alias.grade))] {
                if !known.contains(name) {
                    return Err(file.error(place, format!("{name} is in no table; allowed is {}", known.join(", "))));
                }
            }
            for name in &alias.names {
                let name = file.text("name", name)?;
                let tokens = names::tokens(&name);
                aliases.push(Alias {
                    tokens,
                    name,
                    grade: grade.clone(),
                    today: today.clone(),
                    source: source.clone(),
                });
            }
        }
        Ok(Self { table: raw.table.into_inner(), thinnest, rows, known, aliases })
    }

    /// The one grade that a text names, and a note where it does so by another name only.
    pub fn grade(&self, text: &str) -> Option<(Grade, Option<String>)> {
        let tokens = names::tokens(text);
        let mut own = names::grades(&tokens);
        // A number that is no steel's (`S123`) is no grade; a mark we have never heard of (`S355XY`) is in no table.
        own.retain(|name| self.known.iter().any(|known| known.get(..4) == name.get(..4)));
        let others: Vec<_> = self.aliases.iter().filter(|alias| names::holds(&tokens, &alias.tokens)).collect();
        if let Some(grade) = own.first() {
            let one = own.iter().all(|name| name == grade)
                && others.iter().all(|alias| alias.today.get(..4) == grade.get(..4));
            return one.then(|| (Grade(grade.clone()), None));
        }
        // The longest name is the one that was written: `St52-3`, not `St52`.
        let alias = others.iter().max_by_key(|alias| alias.name.len())?;
        let one = others.iter().all(|other| other.grade == alias.grade);
        let note = format!("{} read as {}: {}", alias.name, alias.grade, alias.source);
        one.then(|| (Grade(alias.grade.clone()), Some(note)))
    }

    pub fn strength(&self, grade: &Grade, thickness: Length) -> Known<Strength> {
        let missing = |reason: String| Missing { what: "steel strength".into(), reason, at: None, ask: Ask::Method };
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
