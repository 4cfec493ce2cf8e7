//! Factors of joints that carry shear.

use serde::Deserialize;
use toml::Spanned;

use super::error::RuleError;
use super::load::RuleFile;
use super::tables::SimpleRules;

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Factor {
    value: Spanned<f64>,
    source: Spanned<String>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    gross_shear: Factor,
    bolt_group: Factor,
    local_shear: Factor,
    block_tearing: Factor,
}

impl RuleFile<'_> {
    /// Every factor within what makes sense, with its source.
    pub fn simple(&self) -> Result<SimpleRules, RuleError> {
        let File { gross_shear, bolt_group, local_shear, block_tearing } = self.parse()?;
        for factor in [&gross_shear, &bolt_group, &local_shear, &block_tearing] {
            self.text("source", &factor.source)?;
        }
        Ok(SimpleRules {
            gross_shear: self.within("gross_shear", &gross_shear.value, 1.0..=2.0)?,
            bolt_group: self.within("bolt_group", &bolt_group.value, 0.1..=1.0)?,
            local_shear: self.within("local_shear", &local_shear.value, 0.1..=1.0)?,
            block_tearing: self.within("block_tearing", &block_tearing.value, 0.1..=1.0)?,
        })
    }
}
