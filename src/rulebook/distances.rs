//! Distances and room of bolts.

use serde::Deserialize;
use toml::Spanned;

use super::error::RuleError;
use super::load::RuleFile;
use super::tables::Distances;
use crate::units::Length;

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Least {
    end: Spanned<f64>,
    edge: Spanned<f64>,
    pitch: Spanned<f64>,
    gauge: Spanned<f64>,
    source: Spanned<String>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Greatest {
    exposed: bool,
    edge_in_thicknesses: Spanned<f64>,
    edge_beside: Spanned<f64>,
    spacing_in_thicknesses: Spanned<f64>,
    spacing: Spanned<f64>,
    source: Spanned<String>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct BoltLength {
    threads_past_nut: Spanned<f64>,
    washers: Spanned<f64>,
    source: Spanned<String>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Tool {
    socket_in_across_flats: Spanned<f64>,
    source: Spanned<String>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct File {
    least: Least,
    greatest: Greatest,
    length: BoltLength,
    tool: Tool,
}

impl RuleFile<'_> {
    /// Every number within what makes sense, every table with its source.
    pub fn distances(&self) -> Result<Distances, RuleError> {
        let File { least, greatest, length, tool } = self.parse()?;
        for source in [&least.source, &greatest.source, &length.source, &tool.source] {
            self.text("source", source)?;
        }
        let holes = |what, value| self.within(what, value, 1.0..=10.0);
        let thicknesses = |what, value| self.within(what, value, 1.0..=50.0);
        Ok(Distances {
            end: holes("end", &least.end)?,
            edge: holes("edge", &least.edge)?,
            pitch: holes("pitch", &least.pitch)?,
            gauge: holes("gauge", &least.gauge)?,
            greatest_edge: thicknesses("edge_in_thicknesses", &greatest.edge_in_thicknesses)?,
            greatest_edge_beside: Length(self.within("edge_beside", &greatest.edge_beside, 0.0..=1000.0)?),
            greatest_spacing: thicknesses("spacing_in_thicknesses", &greatest.spacing_in_thicknesses)?,
            greatest_spacing_most: self.length("spacing", &greatest.spacing)?,
            exposed: greatest.exposed,
            threads_past_nut: self.within("threads_past_nut", &length.threads_past_nut, 0.0..=10.0)?,
            washers: self.within("washers", &length.washers, 0.0..=4.0)?,
            socket: self.within("socket_in_across_flats", &tool.socket_in_across_flats, 1.0..=4.0)?,
        })
    }
}
