//! How entities are written as ifcXML of IFC4 and later.

use std::io::{self, Write};

use quick_xml::Writer;
use quick_xml::events::{BytesDecl, BytesEnd, BytesStart, BytesText, Event};

use super::entity::{Declared, Entity, Field, Link, Sink, hoist, plain};

/// The namespace of IFC4 ADD2 TC1.
pub const ADD2_TC1: &str = "http://www.buildingsmart-tech.org/ifc/IFC4/Add2TC1";
/// The namespace of the first edition of IFC4, in which relations stand with both of their ends.
pub const FIRST: &str = "http://www.buildingsmart-tech.org/ifcXML/IFC4/final";
/// A namespace of IFC4X3.
pub const IFC4X3: &str = "https://standards.buildingsmart.org/IFC/RELEASE/IFC4/3/DEV/ef03d81";

const INSTANCE: &str = "http://www.w3.org/2001/XMLSchema-instance";

/// Ways in which programs differ that mean the same.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Style {
    /// Every entity at the top, all links by reference; otherwise what is owned is nested.
    pub flat: bool,
    /// Elements and types carry the prefix `ifc:`; otherwise the namespace is the default one.
    pub prefixed: bool,
}

/// An ifcXML document being written.
pub struct IfcXml<W: Write> {
    out: Writer<W>,
    style: Style,
    /// Attributes that this version declares as a supertype of what IFC4 declares.
    wider: &'static [&'static str],
    last_id: u64,
}

impl<W: Write> IfcXml<W> {
    /// Opens the document and writes its header.
    pub fn begin(to: W, style: Style, name: &str) -> io::Result<Self> {
        Self::begin_in(to, ADD2_TC1, style, name)
    }

    /// The same in another version's namespace.
    pub fn begin_in(to: W, namespace: &str, style: Style, name: &str) -> io::Result<Self> {
        let wider: &[&str] = if namespace == IFC4X3 { &["Location"] } else { &[] };
        let mut document = Self { out: Writer::new_with_indent(to, b' ', 1), style, wider, last_id: 0 };
        document.out.write_event(Event::Decl(BytesDecl::new("1.0", Some("UTF-8"), None)))?;
        let declares = if style.prefixed { "xmlns:ifc" } else { "xmlns" };
        document.open("ifcXML", &[(declares, namespace), ("xmlns:xsi", INSTANCE)])?;
        document.open("header", &[])?;
        for (element, text) in [
            ("name", name),
            ("time_stamp", "2024-05-02T09:00:00"),
            ("preprocessor_version", "an invented writer 1.0"),
            ("originating_system", "an invented authoring program"),
        ] {
            document.open(element, &[])?;
            document.out.write_event(Event::Text(BytesText::new(text)))?;
            document.close(element)?;
        }
        document.close("header")?;
        Ok(document)
    }

    /// Closes the document.
    pub fn finish(mut self) -> io::Result<()> {
        self.close("ifcXML")?;
        self.out.get_mut().write_all(b"\n")?;
        self.out.get_mut().flush()
    }

    fn tag(&self, name: &str) -> String {
        if self.style.prefixed { format!("ifc:{name}") } else { name.to_owned() }
    }

    fn start(&self, name: &str, attributes: &[(&str, &str)]) -> BytesStart<'static> {
        let mut start = BytesStart::new(self.tag(name));
        for attribute in attributes {
            start.push_attribute(*attribute);
        }
        start
    }

    fn open(&mut self, name: &str, attributes: &[(&str, &str)]) -> io::Result<()> {
        let start = self.start(name, attributes);
        self.out.write_event(Event::Start(start))
    }

    fn close(&mut self, name: &str) -> io::Result<()> {
        let end = BytesEnd::new(self.tag(name));
        self.out.write_event(Event::End(end))
    }

    /// An entity under a name of its own, or of the attribute that holds it.
    fn entity(&mut self, name: &str, say_type: bool, entity: &Entity) -> io::Result<()> {
        let mut start = BytesStart::new(self.tag(name));
        if say_type {
            start.push_attribute(("xsi:type", self.tag(entity.class).as_str()));
        }
        if let Some(id) = entity.id {
            start.push_attribute(("id", format!("i{id}").as_str()));
        }
        for field in &entity.fields {
            if let Field::Simple(name, value) = field {
                start.push_attribute((*name, plain(value).as_str()));
            }
        }
        let children = || entity.fields.iter().filter(|field| !matches!(field, Field::Simple(..)));
        if children().next().is_none() {
            return self.out.write_event(Event::Empty(start));
        }
        self.out.write_event(Event::Start(start))?;
        for field in children() {
            self.child(field)?;
        }
        self.close(name)
    }

    fn child(&mut self, field: &Field) -> io::Result<()> {
        match field {
            Field::Simple(..) => Ok(()),
            Field::Typed(name, of, value) => {
                let wrapper = format!("{of}-wrapper");
                self.open(name, &[])?;
                self.open(&wrapper, &[])?;
                self.out.write_event(Event::Text(BytesText::new(&plain(value))))?;
                self.close(&wrapper)?;
                self.close(name)
            }
            Field::One(name, Declared::Select, link) => self.wrapped(name, std::slice::from_ref(link)),
            Field::One(name, declared, link) => {
                self.link(name, *declared == Declared::Wider || self.wider.contains(name), link)
            }
            Field::Inverse { name, single: true, relations, .. } => {
                relations.iter().try_for_each(|relation| self.link(name, false, relation))
            }
            Field::Many(name, links) | Field::Inverse { name, relations: links, .. } => self.wrapped(name, links),
        }
    }

    fn wrapped(&mut self, name: &str, links: &[Link]) -> io::Result<()> {
        self.open(name, &[])?;
        for link in links {
            let (Link::Own(Entity { class, .. }) | Link::To(class, _)) = link;
            self.link(class, false, link)?;
        }
        self.close(name)
    }

    fn link(&mut self, name: &str, say_type: bool, link: &Link) -> io::Result<()> {
        match link {
            Link::Own(entity) => self.entity(name, say_type, entity),
            Link::To(class, id) => {
                let (class, id) = (self.tag(class), format!("i{id}"));
                let typed: &[(&str, &str)] = if say_type { &[("xsi:type", &class)] } else { &[] };
                let start = self.start(name, &[typed, &[("ref", id.as_str()), ("xsi:nil", "true")]].concat());
                self.out.write_event(Event::Empty(start))
            }
        }
    }
}

impl<W: Write> Sink for IfcXml<W> {
    fn new_id(&mut self) -> u64 {
        self.last_id += 1;
        self.last_id
    }

    fn put(&mut self, mut entity: Entity) -> io::Result<()> {
        if self.style.flat {
            hoist(&mut entity, self, |document, owned| document.entity(owned.class, false, owned))?;
        }
        self.entity(entity.class, false, &entity)
    }
}
