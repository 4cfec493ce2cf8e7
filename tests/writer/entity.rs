//! What a model holds, in EXPRESS names, whatever form it is written in.

use std::io;

use super::guid::global_id;

/// An entity to be written.
#[derive(Clone, Debug)]
pub struct Entity {
    /// The class as EXPRESS spells it.
    pub class: &'static str,
    /// The number by which others refer to it, if any does.
    pub id: Option<u64>,
    /// Attributes and held relations, in the order of the supertypes from the root down (as the XSD wants it).
    pub fields: Vec<Field>,
}

/// An attribute, or relations that the entity holds through an inverse attribute.
#[derive(Clone, Debug)]
pub enum Field {
    /// A simple value, or a list of numbers.
    Simple(&'static str, Simple),
    /// One entity.
    One(&'static str, Declared, Link),
    /// A list or set of entities.
    Many(&'static str, Vec<Link>),
    /// A defined type chosen in a SELECT.
    Typed(&'static str, &'static str, Simple),
    /// Relations that point back here.
    Inverse {
        /// The inverse attribute: `IsDefinedBy`.
        name: &'static str,
        /// The relations' attribute that points back: `RelatedObjects`.
        back: &'static str,
        /// Whether at most one relation is allowed, which ifcXML then writes without a wrapper.
        single: bool,
        /// The relations.
        relations: Vec<Link>,
    },
}

/// A simple value.
#[derive(Clone, Debug)]
pub enum Simple {
    /// A string.
    Text(String),
    /// A real.
    Real(f64),
    /// An integer.
    Integer(i64),
    /// A boolean.
    Truth(bool),
    /// An enumeration item, upper case.
    Token(&'static str),
    /// A list of reals.
    Reals(Vec<f64>),
}

/// How an attribute that holds an entity is declared.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Declared {
    /// As the very class that is given.
    Exactly,
    /// As a supertype of it.
    Wider,
    /// As a SELECT.
    Select,
}

/// An entity where another points to it.
#[derive(Clone, Debug)]
pub enum Link {
    /// Defined here.
    Own(Entity),
    /// Defined elsewhere, before or after: class and number.
    To(&'static str, u64),
}

/// Where entities go, one by one.
pub trait Sink {
    /// A number that no other entity has.
    fn new_id(&mut self) -> u64;

    /// Writes an entity with all that it owns.
    fn put(&mut self, entity: Entity) -> io::Result<()>;
}

impl Entity {
    /// An entity without attributes.
    pub fn new(class: &'static str) -> Self {
        Self { class, id: None, fields: Vec::new() }
    }

    /// An IfcRoot: its GlobalId follows from the path.
    pub fn root(class: &'static str, path: &str) -> Self {
        Self::new(class).text("GlobalId", &global_id(path))
    }

    /// With a number to refer to.
    pub fn id(mut self, id: u64) -> Self {
        self.id = Some(id);
        self
    }

    /// With any field.
    pub fn field(mut self, field: Field) -> Self {
        self.fields.push(field);
        self
    }

    /// With a string.
    pub fn text(self, name: &'static str, value: &str) -> Self {
        self.field(Field::Simple(name, Simple::Text(value.to_owned())))
    }

    /// With a real.
    pub fn real(self, name: &'static str, value: f64) -> Self {
        self.field(Field::Simple(name, Simple::Real(value)))
    }

    /// With an integer.
    pub fn integer(self, name: &'static str, value: i64) -> Self {
        self.field(Field::Simple(name, Simple::Integer(value)))
    }

    /// With an enumeration item.
    pub fn token(self, name: &'static str, value: &'static str) -> Self {
        self.field(Field::Simple(name, Simple::Token(value)))
    }

    /// With a list of reals.
    pub fn reals(self, name: &'static str, values: &[f64]) -> Self {
        self.field(Field::Simple(name, Simple::Reals(values.to_vec())))
    }

    /// With one entity.
    pub fn one(self, name: &'static str, declared: Declared, link: impl Into<Link>) -> Self {
        self.field(Field::One(name, declared, link.into()))
    }

    /// With a list of entities.
    pub fn many(self, name: &'static str, links: Vec<Link>) -> Self {
        self.field(Field::Many(name, links))
    }

    /// With relations that point back.
    pub fn held(self, name: &'static str, back: &'static str, relations: Vec<Link>) -> Self {
        self.field(Field::Inverse { name, back, single: false, relations })
    }

    /// With the one relation that may point back.
    pub fn held_single(self, name: &'static str, back: &'static str, relation: Link) -> Self {
        self.field(Field::Inverse { name, back, single: true, relations: vec![relation] })
    }
}

impl Field {
    /// Its attribute.
    pub fn name(&self) -> &'static str {
        match self {
            Self::Simple(name, _) | Self::One(name, ..) | Self::Many(name, _) | Self::Typed(name, ..) => name,
            Self::Inverse { name, .. } => name,
        }
    }

    /// The entities that it holds or refers to.
    pub fn links_mut(&mut self) -> &mut [Link] {
        match self {
            Self::One(_, _, link) => std::slice::from_mut(link),
            Self::Many(_, links) => links,
            Self::Inverse { relations, .. } => relations,
            Self::Simple(..) | Self::Typed(..) => &mut [],
        }
    }
}

impl From<Entity> for Link {
    fn from(entity: Entity) -> Self {
        Self::Own(entity)
    }
}

/// Links to entities that are defined elsewhere.
pub fn links(to: &[(&'static str, u64)]) -> Vec<Link> {
    to.iter().map(|(class, id)| Link::To(class, *id)).collect()
}

/// Writes all that an entity owns, deepest first, and leaves links in its place.
pub fn hoist<S: Sink>(
    entity: &mut Entity,
    sink: &mut S,
    write: fn(&mut S, &Entity) -> io::Result<()>,
) -> io::Result<()> {
    for link in entity.fields.iter_mut().flat_map(Field::links_mut) {
        if let Link::Own(owned) = link {
            hoist(owned, sink, write)?;
            let id = *owned.id.get_or_insert_with(|| sink.new_id());
            write(sink, owned)?;
            *link = Link::To(owned.class, id);
        }
    }
    Ok(())
}

/// A simple value as XML writes it.
pub fn plain(value: &Simple) -> String {
    match value {
        Simple::Text(text) => text.clone(),
        Simple::Real(real) => number(*real),
        Simple::Integer(integer) => integer.to_string(),
        Simple::Truth(truth) => truth.to_string(),
        Simple::Token(token) => token.to_lowercase(),
        Simple::Reals(reals) => reals.iter().map(|real| number(*real)).collect::<Vec<_>>().join(" "),
    }
}

/// A real to a millionth, so that the noise of additions is not written.
pub fn number(real: f64) -> String {
    let rounded = (real * 1e6).round() / 1e6;
    // Adding zero turns a negative zero into a plain one.
    format!("{}", rounded + 0.0)
}
