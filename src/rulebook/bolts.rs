//! Bolt sizes, strength classes and hole clearances.

use std::collections::BTreeMap;

use serde::Deserialize;
use toml::Spanned;

use super::error::RuleError;
use super::load::RuleFile;
use super::tables::{BoltClass, BoltSize, Clearance, SlipRules};
use crate::units::{Area, Length};

/// What `bolts.toml` holds.
#[derive(Debug, Default)]
pub(super) struct Bolts {
    pub alpha_v_shank: f64,
    pub classes: Vec<BoltClass>,
    pub clearances: Vec<Clearance>,
    pub sizes: Vec<BoltSize>,
    pub slip: SlipRules,
}

impl Bolts {
    pub fn load(rules: RuleFile<'_>) -> Result<Self, RuleError> {
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct Class {
            name: Spanned<String>,
            f_yb: Spanned<f64>,
            f_ub: Spanned<f64>,
            alpha_v: Spanned<f64>,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct Gap {
            up_to: Spanned<f64>,
            round: Spanned<f64>,
            oversize: Spanned<f64>,
            short_slot: Spanned<f64>,
            long_slot: Spanned<f64>,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct Size {
            d: Spanned<f64>,
            pitch: Spanned<f64>,
            a_s: Spanned<f64>,
            across_flats: Spanned<f64>,
            across_corners: Spanned<f64>,
            across_flats_preloaded: Spanned<f64>,
            washer: Spanned<f64>,
            washer_thickness: Spanned<f64>,
            head: Spanned<f64>,
            nut: Spanned<f64>,
            nut_preloaded: Spanned<f64>,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct Slip {
            preloaded: Vec<String>,
            friction: BTreeMap<String, Spanned<f64>>,
            reduced_by_tension: bool,
        }
        #[derive(Deserialize)]
        #[serde(deny_unknown_fields)]
        struct File {
            alpha_v_shank: Spanned<f64>,
            slip: Slip,
            class: Vec<Class>,
            clearance: Vec<Gap>,
            size: Vec<Size>,
        }
        let file: File = rules.parse()?;
        let mut bolts =
            Bolts { alpha_v_shank: rules.within("alpha_v_shank", &file.alpha_v_shank, 0.1..=0.7)?, ..Self::default() };
        bolts.slip.preloaded = file.slip.preloaded;
        bolts.slip.reduced_by_tension = file.slip.reduced_by_tension;
        for (class, mu) in &file.slip.friction {
            bolts.slip.friction.insert(class.clone(), rules.within("friction", mu, 0.05..=0.8)?);
        }
        for class in &file.class {
            let name = rules.text("name", &class.name)?;
            if bolts.classes.iter().any(|other| other.name == name) {
                return Err(rules.error(&class.name, format!("class {name} stands twice; once is allowed")));
            }
            let (f_yb, f_ub) = (rules.stress("f_yb", &class.f_yb)?, rules.stress("f_ub", &class.f_ub)?);
            if f_yb > f_ub {
                return Err(
                    rules.error(&class.f_yb, format!("f_yb = {f_yb} is above f_ub = {f_ub}; at most f_ub is allowed"))
                );
            }
            let alpha_v = rules.within("alpha_v", &class.alpha_v, 0.1..=0.7)?;
            bolts.classes.push(BoltClass { name, f_yb, f_ub, alpha_v });
        }
        for gap in &file.clearance {
            let up_to = rules.length("up_to", &gap.up_to)?;
            if bolts.clearances.last().is_some_and(|last| last.up_to >= up_to) {
                return Err(rules.error(
                    &gap.up_to,
                    format!("up_to = {up_to} does not rise; each entry goes further than the last"),
                ));
            }
            let size = |what, value| rules.within(what, value, 0.0..=20.0).map(Length);
            bolts.clearances.push(Clearance {
                up_to,
                round: size("round", &gap.round)?,
                oversize: size("oversize", &gap.oversize)?,
                short_slot: size("short_slot", &gap.short_slot)?,
                long_slot: rules.within("long_slot", &gap.long_slot, 1.0..=3.0)?,
            });
        }
        for size in &file.size {
            let d = rules.length("d", &size.d)?;
            if bolts.sizes.last().is_some_and(|last| last.d >= d) {
                return Err(
                    rules.error(&size.d, format!("d = {d} does not rise; sizes stand from small to large, each once"))
                );
            }
            let Some(clearance) = bolts.clearances.iter().find(|c| c.up_to >= d) else {
                return Err(rules.error(&size.d, format!("no clearance goes up to d = {d}; one is needed")));
            };
            let a = Area(std::f64::consts::PI * d.get() * d.get() / 4.0);
            let a_s = Area(rules.positive("a_s", &size.a_s, a.get())?);
            let across_flats = rules.length("across_flats", &size.across_flats)?;
            bolts.sizes.push(BoltSize {
                d,
                pitch: Length(rules.within("pitch", &size.pitch, 0.5..=10.0)?),
                a,
                a_s,
                d_0: d + clearance.round,
                across_flats,
                across_corners: Length(rules.within(
                    "across_corners",
                    &size.across_corners,
                    across_flats.get()..=1000.0,
                )?),
                across_flats_preloaded: rules.length("across_flats_preloaded", &size.across_flats_preloaded)?,
                washer: rules.length("washer", &size.washer)?,
                washer_thickness: rules.length("washer_thickness", &size.washer_thickness)?,
                head: rules.length("head", &size.head)?,
                nut: rules.length("nut", &size.nut)?,
                nut_preloaded: rules.length("nut_preloaded", &size.nut_preloaded)?,
            });
        }
        Ok(bolts)
    }
}
