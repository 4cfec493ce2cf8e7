//! How entities are written as ifcXML of IFC2X3, by ISO 10303-28.

use std::io::{self, Write};

use quick_xml::Writer;
use quick_xml::events::{BytesDecl, BytesEnd, BytesStart, BytesText, Event};

use super::entity::{Entity, Field, Link, Simple, Sink, hoist, number, plain};
use super::version::Version;

const COMMON: &str = "urn:iso.org:standard:10303:part(28):version(2):xmlschema:common";
const NAMESPACE: &str = "http://www.iai-tech.org/ifcXML/IFC2x3/FINAL";
const INSTANCE: &str = "http://www.w3.org/2001/XMLSchema-instance";

/// A document being written. It knows no inverse attributes: relations come with both of their ends.
pub struct Part28<W: Write> {
    out: Writer<W>,
    last_id: u64,
}

impl<W: Write> Part28<W> {
    /// Opens the document and writes its header.
    pub fn begin(to: W, name: &str) -> io::Result<Self> {
        let mut document = Self { out: Writer::new_with_indent(to, b' ', 1), last_id: 0 };
        document.out.write_event(Event::Decl(BytesDecl::new("1.0", Some("UTF-8"), None)))?;
        document.open("ex:iso_10303_28", &[("version", "2.0"), ("xmlns:ex", COMMON), ("xmlns:xsi", INSTANCE)])?;
        document.open("ex:iso_10303_28_header", &[])?;
        for (element, text) in [
            ("ex:name", name),
            ("ex:time_stamp", "2024-05-02T09:00:00"),
            ("ex:author", ""),
            ("ex:organization", ""),
            ("ex:preprocessor_version", "an invented writer 1.0"),
            ("ex:originating_system", "an invented authoring program"),
            ("ex:authorization", ""),
            ("ex:documentation", ""),
        ] {
            document.leaf(element, &[], text)?;
        }
        document.close("ex:iso_10303_28_header")?;
        document.open("uos", &[("xmlns", NAMESPACE), ("id", "uos_1"), ("configuration", "i-ifc2x3")])?;
        Ok(document)
    }

    /// Closes the document.
    pub fn finish(mut self) -> io::Result<()> {
        self.close("uos")?;
        self.close("ex:iso_10303_28")?;
        self.out.get_mut().write_all(b"\n")?;
        self.out.get_mut().flush()
    }

    fn open(&mut self, name: &str, attributes: &[(&str, &str)]) -> io::Result<()> {
        let start = BytesStart::new(name).with_attributes(attributes.iter().copied());
        self.out.write_event(Event::Start(start))
    }

    fn close(&mut self, name: &str) -> io::Result<()> {
        self.out.write_event(Event::End(BytesEnd::new(name)))
    }

    fn leaf(&mut self, name: &str, attributes: &[(&str, &str)], text: &str) -> io::Result<()> {
        self.open(name, attributes)?;
        self.out.write_event(Event::Text(BytesText::new(text)))?;
        self.close(name)
    }

    fn record(&mut self, entity: &Entity) -> io::Result<()> {
        let id = entity.id.unwrap_or_else(|| self.new_id());
        let attributes = Version::Ifc2x3.schema().attributes(entity.class);
        let unknown = entity.fields.iter().find(|field| !attributes.iter().any(|a| a.name == field.name()));
        assert!(unknown.is_none(), "{} of IFC2X3 has no {unknown:?}", entity.class);
        self.open(entity.class, &[("id", &format!("i{id}"))])?;
        for attribute in attributes.iter().filter(|attribute| !attribute.derived) {
            if let Some(field) = entity.fields.iter().find(|field| field.name() == attribute.name) {
                self.attribute(field)?;
            }
        }
        self.close(entity.class)
    }

    fn attribute(&mut self, field: &Field) -> io::Result<()> {
        let name = field.name();
        match field {
            Field::Simple(_, Simple::Reals(reals)) => {
                let item = if name == "Coordinates" { "IfcLengthMeasure" } else { "ex:double-wrapper" };
                self.open(name, &[("ex:cType", "list")])?;
                for (index, real) in reals.iter().enumerate() {
                    self.leaf(item, &[("pos", &index.to_string())], &number(*real))?;
                }
            }
            Field::Simple(_, value) => return self.leaf(name, &[], &plain(value)),
            Field::Typed(_, of, value) => {
                self.open(name, &[])?;
                self.leaf(of, &[], &plain(value))?;
            }
            Field::One(_, _, link) => {
                self.open(name, &[])?;
                self.reference(link, None)?;
            }
            Field::Many(_, links) => {
                self.open(name, &[])?;
                for (index, link) in links.iter().enumerate() {
                    self.reference(link, Some(index))?;
                }
            }
            Field::Inverse { name, .. } => unreachable!("{name} is taken out before"),
        }
        self.close(name)
    }

    fn reference(&mut self, link: &Link, pos: Option<usize>) -> io::Result<()> {
        let Link::To(class, id) = link else { unreachable!("what is owned is written before") };
        let mut start = BytesStart::new(*class);
        if let Some(pos) = pos {
            start.push_attribute(("pos", pos.to_string().as_str()));
        }
        start.push_attribute(("ref", format!("i{id}").as_str()));
        start.push_attribute(("xsi:nil", "true"));
        self.out.write_event(Event::Empty(start))
    }
}

impl<W: Write> Sink for Part28<W> {
    fn new_id(&mut self) -> u64 {
        self.last_id += 1;
        self.last_id
    }

    fn put(&mut self, mut entity: Entity) -> io::Result<()> {
        hoist(&mut entity, self, Self::record)?;
        self.record(&entity)
    }
}
