//! Reads an exchange, of whatever form, into one entity graph. The only room that knows IFC syntax.

mod archive;
mod conform;
mod entity;
mod graph;
mod ifcxml;
mod labels;
mod problems;
mod scalar;
mod schema;
mod sniff;
mod step;
mod store;
mod value;
mod waiting;

pub use entity::{Entity, Id};
pub use graph::Entities;
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
    if !archive::is_archive(bytes) {
        return read_plain(bytes, file);
    }
    let mut problems = problems::Problems::new(file.into());
    let (member, model) = archive::model(bytes, &mut problems).map_err(|reason| unreadable(file, &reason))?;
    let mut exchange = read_plain(&model, &format!("{file}/{member}"))?;
    exchange.problems.splice(..0, problems.finish());
    Ok(exchange)
}

fn read_plain(bytes: &[u8], file: &str) -> Result<Exchange, Unreadable> {
    let name: Arc<str> = file.into();
    let mut problems = problems::Problems::new(name.clone());
    sniff::decode(bytes, &mut problems)
        .and_then(|text| match sniff::is_step(&text) {
            true => step::read(&text, problems, name),
            false => ifcxml::read(&text, problems, name),
        })
        .map_err(|reason| unreadable(file, &reason))
}

/// One line, whatever of the file a reason quotes.
fn unreadable(file: &str, reason: &str) -> Unreadable {
    let plain = |c: char| if c.is_control() { '\u{fffd}' } else { c };
    Unreadable { file: file.to_owned(), reason: format!("the file {}", reason.chars().map(plain).collect::<String>()) }
}
