//! Writes exchanges as an authoring program would, from a plain description of a building; for tests and benchmarks only.
//!
//! Three floors: [`building`] says what stands there (mm, grades, marks), [`model`] turns that into entities with
//! EXPRESS names ([`entity`]), and a [`Sink`](entity::Sink) says how entities are written ([`ifcxml`], [`step`],
//! [`part28`]). Entities leave one by one, so memory grows with the count of elements only by an id each, never by
//! their content.

pub mod building;
pub mod entity;
pub mod fastening;
pub mod fittings;
pub mod frames;
pub mod guid;
pub mod hardware;
pub mod ifcxml;
pub mod model;
pub mod part28;
mod parts;
mod schema;
mod shapes;
pub mod space;
pub mod step;
pub mod two_ended;
pub mod version;

use std::io::{self, Write};

use building::Building;
use ifcxml::{FIRST, IFC4X3, IfcXml, Style};
use part28::Part28;
use step::Step;
use two_ended::TwoEnded;
use version::{AsIfc2x3, Version};

/// A form that an exchange has.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Form {
    /// ifcXML of IFC4 ADD2 TC1.
    IfcXml(Style),
    /// ifcXML of the first edition of IFC4: relations stand with both ends. Of property sets its XSD allows one object a
    /// relation; here as many share one as in the other forms, so that the graphs can be compared.
    FirstEdition,
    /// ifcXML of IFC4X3.
    IfcXml4x3,
    /// ifcXML of IFC2X3, by ISO 10303-28.
    Part28,
    /// A STEP physical file.
    Step(Version),
}

/// Writes the building in a form.
pub fn write(building: &Building, form: Form, to: impl Write) -> io::Result<()> {
    let name = &building.name;
    match form {
        Form::IfcXml(style) => write_ifcxml(building, style, to),
        Form::IfcXml4x3 => {
            let mut sink = IfcXml::begin_in(to, IFC4X3, Style::default(), name)?;
            model::write(building, &mut sink)?;
            sink.finish()
        }
        Form::FirstEdition => {
            let mut sink = TwoEnded::but(IfcXml::begin_in(to, FIRST, Style::default(), name)?, "ParentContext");
            model::write(building, &mut sink)?;
            sink.finish()?.finish()
        }
        Form::Part28 => {
            let mut sink = AsIfc2x3::begin(TwoEnded::new(Part28::begin(to, name)?))?;
            model::write(building, &mut sink)?;
            sink.to.finish()?.finish()
        }
        Form::Step(Version::Ifc2x3) => {
            let mut sink = AsIfc2x3::begin(TwoEnded::new(Step::begin(to, Version::Ifc2x3, name)?))?;
            model::write(building, &mut sink)?;
            sink.to.finish()?.finish()
        }
        Form::Step(version) => {
            let mut sink = TwoEnded::new(Step::begin(to, version, name)?);
            model::write(building, &mut sink)?;
            sink.finish()?.finish()
        }
    }
}

/// The same of a building that is small enough for memory.
pub fn bytes(building: &Building, form: Form) -> Vec<u8> {
    let mut bytes = Vec::new();
    write(building, form, &mut bytes).expect("writing to memory does not fail");
    bytes
}

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
