//! Writes exchanges as an authoring program would, from a plain description of a building; for tests and benchmarks only.
//!
//! Three floors: [`building`] says what stands there (mm, grades, marks), [`model`] turns that into entities with
//! EXPRESS names ([`entity`]), and a [`Sink`](entity::Sink) says how entities are written ([`ifcxml`]). Entities leave
//! one by one, so memory grows with the count of elements only by an id each, never by their content.

pub mod building;
pub mod entity;
mod fastening;
pub mod frames;
pub mod guid;
pub mod hardware;
pub mod ifcxml;
pub mod model;
mod parts;
mod shapes;
mod space;

use std::io::{self, Write};

use building::Building;
use ifcxml::{IfcXml, Style};

/// Writes the building as IFC4 ADD2 TC1 ifcXML.
pub fn write_ifcxml(building: &Building, style: Style, to: impl Write) -> io::Result<()> {
    let mut sink = IfcXml::begin(to, style, &building.name)?;
    model::write(building, &mut sink)?;
    sink.finish()
}

/// The ifcXML of a building that is small enough for memory.
pub fn ifcxml_bytes(building: &Building, style: Style) -> Vec<u8> {
    let mut bytes = Vec::new();
    write_ifcxml(building, style, &mut bytes).expect("writing to memory does not fail");
    bytes
}
