//! Reads the rule files, embedded or given, and says where one is wrong.

use std::collections::BTreeMap;
use std::ops::RangeInclusive;

use serde::Deserialize;
use serde::de::DeserializeOwned;
use toml::Spanned;

use super::error::RuleError;
use super::{Alpha, Annex, ModeOne, RowForces, Settings, Tolerances, WeldRules};
use crate::units::{Length, Stress};

/// Every rule file that the program carries.
pub(super) const EMBEDDED: &[(&str, &str)] = &[
    ("annexes/de.toml", include_str!("../../rules/annexes/de.toml")),
    ("annexes/es.toml", include_str!("../../rules/annexes/es.toml")),
    ("annexes/fr.toml", include_str!("../../rules/annexes/fr.toml")),
    ("annexes/it.toml", include_str!("../../rules/annexes/it.toml")),
    ("annexes/nl.toml", include_str!("../../rules/annexes/nl.toml")),
    ("annexes/recommended.toml", include_str!("../../rules/annexes/recommended.toml")),
    ("annexes/uk.toml", include_str!("../../rules/annexes/uk.toml")),
    ("bolts.toml", include_str!("../../rules/bolts.toml")),
    ("detailing.toml", include_str!("../../rules/detailing.toml")),
    ("simple.toml", include_str!("../../rules/simple.toml")),
    ("distances.toml", include_str!("../../rules/distances.toml")),
    ("sections/hea.csv", include_str!("../../rules/sections/hea.csv")),
    ("sections/heb.csv", include_str!("../../rules/sections/heb.csv")),
    ("sections/hem.csv", include_str!("../../rules/sections/hem.csv")),
    ("sections/ipe.csv", include_str!("../../rules/sections/ipe.csv")),
    ("sections/ub.csv", include_str!("../../rules/sections/ub.csv")),
    ("sections/uc.csv", include_str!("../../rules/sections/uc.csv")),
    ("steel.toml", include_str!("../../rules/steel.toml")),
    ("tolerances.toml", include_str!("../../rules/tolerances.toml")),
    ("vocabulary.toml", include_str!("../../rules/vocabulary.toml")),
    ("welds.toml", include_str!("../../rules/welds.toml")),
];

/// A rule file that is being read.
#[derive(Clone, Copy)]
pub(super) struct RuleFile<'a> {
    pub name: &'a str,
    pub text: &'a str,
}

type Parsed<T> = Result<T, RuleError>;
type Number = Spanned<f64>;

#[derive(Clone, Copy, Deserialize)]
enum Rows {
    #[serde(rename = "by-annex")]
    ByAnnex,
    #[serde(rename = "linear-beyond-1.9")]
    Linear,
    #[serde(rename = "thin-plate-or-linear")]
    Thin,
}

impl Rows {
    fn choice(self) -> Option<RowForces> {
        match self {
            Self::ByAnnex => None,
            Self::Linear => Some(RowForces::LinearBeyond19),
            Self::Thin => Some(RowForces::ThinPlateOrLinear),
        }
    }
}

impl RuleFile<'_> {
    pub(super) fn error<T>(&self, spanned: &Spanned<T>, message: impl Into<String>) -> RuleError {
        RuleError::new(self.name, self.text, Some(spanned.span()), message)
    }

    pub(super) fn parse<T: DeserializeOwned>(&self) -> Parsed<T> {
        toml::from_str(self.text).map_err(|e| RuleError::new(self.name, self.text, e.span(), e.message().trim()))
    }

    pub(super) fn within(&self, what: &str, value: &Number, allowed: RangeInclusive<f64>) -> Parsed<f64> {
        let given = *value.get_ref();
        if allowed.contains(&given) {
            return Ok(given);
        }
        let message = format!("{what} = {given}; allowed is {} to {}", allowed.start(), allowed.end());
        Err(self.error(value, message))
    }

    /// A size: more than nothing, at most `most`.
    pub(super) fn positive(&self, what: &str, value: &Number, most: f64) -> Parsed<f64> {
        let given = *value.get_ref();
        if given > 0.0 && given <= most {
            return Ok(given);
        }
        Err(self.error(value, format!("{what} = {given}; allowed is more than 0 up to {most}")))
    }

    pub(super) fn length(&self, what: &str, value: &Number) -> Parsed<Length> {
        self.positive(what, value, 1000.0).map(Length)
    }

    pub(super) fn stress(&self, what: &str, value: &Number) -> Parsed<Stress> {
        self.positive(what, value, 2000.0).map(Stress)
    }

    pub(super) fn text(&self, what: &str, value: &Spanned<String>) -> Parsed<String> {
        let given = value.get_ref().trim();
        if given.is_empty() {
            Err(self.error(value, format!("{what} is empty; a text is needed")))
        } else {
            Ok(given.into())
        }
    }

    pub fn annex(&self) -> Parsed<Annex> {
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct Factor {
            value: Number,
            source: Spanned<String>,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct Choice {
            choice: Rows,
            source: Spanned<String>,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        #[allow(non_snake_case, reason = "the standard's symbols are the keys of the file")]
        struct File {
            name: Spanned<String>,
            gamma_M0: Factor,
            gamma_M1: Factor,
            gamma_M2: Factor,
            gamma_Mu: Option<Factor>,
            row_forces: Option<Choice>,
            gamma_M3: Option<Factor>,
            gamma_M3_ser: Option<Factor>,
        }
        let file: File = self.parse()?;
        let mut sources: Vec<String> = Vec::new();
        let mut factor = |what: &str, factor: &Factor| {
            sources.push(format!("{}: {}", what.replace("gamma_", "γ_"), self.text("source", &factor.source)?));
            self.within(what, &factor.value, 1.0..=2.0)
        };
        let gamma_m0 = factor("gamma_M0", &file.gamma_M0)?;
        let gamma_m1 = factor("gamma_M1", &file.gamma_M1)?;
        let gamma_m2 = factor("gamma_M2", &file.gamma_M2)?;
        let gamma_mu = file.gamma_Mu.as_ref().map(|given| factor("gamma_Mu", given)).transpose()?;
        let gamma_m3 = match (&file.gamma_M3, &file.gamma_M3_ser) {
            (Some(ultimate), Some(service)) => Some((factor("gamma_M3", ultimate)?, factor("gamma_M3_ser", service)?)),
            _ => None,
        };
        if let Some(rows) = &file.row_forces {
            sources.push(format!("row forces: {}", self.text("source", &rows.source)?));
        }
        Ok(Annex {
            gamma_m0,
            gamma_m1,
            gamma_m2,
            gamma_mu,
            row_forces: file.row_forces.and_then(|rows| rows.choice.choice()),
            gamma_m3,
            name: self.text("name", &file.name)?,
            source: sources.join("; "),
        })
    }

    /// The settings, and the annex they choose.
    pub fn settings(&self) -> Parsed<(Settings, Spanned<String>)> {
        #[derive(Deserialize)]
        enum From {
            #[serde(rename = "chart")]
            Chart,
            #[serde(rename = "draft-2024")]
            Draft,
        }
        #[derive(Deserialize)]
        enum Mode {
            #[serde(rename = "method-1")]
            One,
            #[serde(rename = "method-2")]
            Two,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct File {
            annex: Spanned<String>,
            row_forces: Rows,
            alpha: From,
            mode_one: Mode,
            strength_by_flange: bool,
            alpha_max: Number,
            shear_only_below: Number,
            shear_with_full_tension: bool,
            thread_in_shear_plane: bool,
            axial_limit: Number,
            k_wc: Number,
        }
        let file: File = self.parse()?;
        let settings = Settings {
            // By annex: set when the annex is taken.
            row_forces: file.row_forces.choice().unwrap_or(RowForces::LinearBeyond19),
            row_forces_by_annex: file.row_forces.choice().is_none(),
            alpha: match file.alpha {
                From::Chart => Alpha::Chart,
                From::Draft => Alpha::Draft2024,
            },
            mode_one: match file.mode_one {
                Mode::One => ModeOne::Method1,
                Mode::Two => ModeOne::Method2,
            },
            strength_by_flange: file.strength_by_flange,
            alpha_max: self.within("alpha_max", &file.alpha_max, 4.45..=8.0)?,
            shear_only_below: self.within("shear_only_below", &file.shear_only_below, 0.0..=1.0)?,
            shear_with_full_tension: file.shear_with_full_tension,
            thread_in_shear_plane: file.thread_in_shear_plane,
            axial_limit: self.within("axial_limit", &file.axial_limit, 0.0..=0.05)?,
            k_wc: self.within("k_wc", &file.k_wc, 0.7..=1.0)?,
        };
        Ok((settings, file.annex))
    }

    pub fn tolerances(&self) -> Parsed<Tolerances> {
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct File {
            position: Number,
            touch: Number,
            size: Number,
            angle: Number,
            utilisation: Number,
        }
        let file: File = self.parse()?;
        Ok(Tolerances {
            position: Length(self.within("position", &file.position, 0.01..=20.0)?),
            touch: Length(self.within("touch", &file.touch, 0.01..=20.0)?),
            size: Length(self.within("size", &file.size, 0.001..=2.0)?),
            angle: self.within("angle", &file.angle, 0.001..=10.0)?,
            utilisation: self.within("utilisation", &file.utilisation, 0.0..=0.05)?,
        })
    }

    pub fn welds(&self) -> Parsed<WeldRules> {
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct Beta {
            grades: Vec<Spanned<String>>,
            value: Number,
            source: Spanned<String>,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct File {
            min_throat: Number,
            min_length: Number,
            min_length_in_throats: Number,
            end_loss_in_throats: Number,
            beta_w: Vec<Beta>,
        }
        let file: File = self.parse()?;
        let mut beta_w = BTreeMap::new();
        for beta in &file.beta_w {
            let value = self.within("beta_w", &beta.value, 0.8..=1.0)?;
            self.text("source", &beta.source)?;
            for grade in &beta.grades {
                if beta_w.insert(self.text("grade", grade)?, value).is_some() {
                    return Err(self.error(grade, format!("{} stands twice; once is allowed", grade.get_ref())));
                }
            }
        }
        Ok(WeldRules {
            min_throat: self.length("min_throat", &file.min_throat)?,
            min_length: self.length("min_length", &file.min_length)?,
            min_length_in_throats: self.within("min_length_in_throats", &file.min_length_in_throats, 0.0..=100.0)?,
            end_loss_in_throats: self.within("end_loss_in_throats", &file.end_loss_in_throats, 0.0..=10.0)?,
            beta_w,
        })
    }
}
