//! Reads an exchange, of whatever form, into one entity graph. The only room that knows IFC syntax.

mod archive;
mod cell;
mod conform;
mod entity;
mod graph;
mod ifcxml;
mod labels;
mod limits;
mod problems;
mod scalar;
mod schema;
mod sniff;
mod source;
mod step;
mod store;
mod value;
mod waiting;

pub use entity::{Entity, Id};
pub use graph::Entities;
pub use limits::Limits;
pub use value::{Inner, List, Value, View};

use std::sync::Arc;

use crate::origin::Problem;

/// An exchange as read: the entity graph, what form it had, and what could not be understood.
#[derive(Debug)]
pub struct Exchange {
    /// Schema and form, for people: "IFC4 ifcXML", "IFC2X3 STEP".
    pub form: String,
    /// The graph.
    pub entities: Entities,
    /// What could not be understood, in file order.
    pub problems: Vec<Problem>,
}

/// Why a file is no exchange at all; the only way in which reading fails.
#[derive(Debug, thiserror::Error)]
#[error("{file}: {reason}")]
pub struct Unreadable {
    /// The file as the caller named it.
    pub file: String,
    /// One sentence without the file's name.
    pub reason: String,
}

/// Reads an exchange from its bytes; `file` is only used to name places. What lies in an archive has places such as
/// "archive.ifczip/model.ifc:3:1".
///
/// # Errors
/// [`Unreadable`] where the bytes are no exchange: empty, truncated, neither ifcXML nor STEP, a DTD inside, an archive
/// without exactly one model.
pub fn read(bytes: &[u8], file: &str) -> Result<Exchange, Unreadable> {
    read_within(bytes, file, Limits::default())
}

/// As [`read`], within other limits.
///
/// # Errors
/// As of [`read`].
pub fn read_within(bytes: &[u8], file: &str, limits: Limits) -> Result<Exchange, Unreadable> {
    let limits = limits.lowered();
    if !archive::is_archive(bytes) {
        return read_plain(bytes, file, limits);
    }
    let mut problems = problems::Problems::new(file.into());
    let (member, model) = archive::model(bytes, limits, &mut problems).map_err(|reason| unreadable(file, &reason))?;
    let mut exchange = read_plain(&model, &format!("{file}/{member}"), limits)?;
    exchange.problems.splice(..0, problems.finish());
    Ok(exchange)
}

fn read_plain(bytes: &[u8], file: &str, limits: Limits) -> Result<Exchange, Unreadable> {
    let name: Arc<str> = file.into();
    let mut problems = problems::Problems::new(name.clone());
    sniff::decode(bytes, limits, &mut problems)
        .and_then(|text| match sniff::is_step(&text) {
            true => step::read(&text, problems, name, limits),
            false => ifcxml::read(&text, problems, name, limits),
        })
        .map_err(|reason| unreadable(file, &reason))
}

/// One line, whatever of the file a reason quotes.
fn unreadable(file: &str, reason: &str) -> Unreadable {
    let plain = |c: char| if c.is_control() { '\u{fffd}' } else { c };
    Unreadable { file: file.to_owned(), reason: format!("the file {}", reason.chars().map(plain).collect::<String>()) }
}
