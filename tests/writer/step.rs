//! How entities are written as a STEP physical file (ISO 10303-21).

use std::io::{self, Write};

use super::entity::{Entity, Field, Link, Simple, Sink, hoist, number};
use super::version::Version;

/// A file being written. It knows no inverse attributes: relations come with both of their ends.
pub struct Step<W: Write> {
    out: W,
    version: Version,
    last_id: u64,
}

impl<W: Write> Step<W> {
    /// Opens the file and writes its header.
    pub fn begin(mut out: W, version: Version, name: &str) -> io::Result<Self> {
        let (name, schema) = (text(name), version.name());
        write!(
            out,
            "ISO-10303-21;\nHEADER;\nFILE_DESCRIPTION((''),'2;1');\n\
             FILE_NAME({name},'2024-05-02T09:00:00',(''),(''),'an invented writer 1.0','an invented authoring program','');\n\
             FILE_SCHEMA(('{schema}'));\nENDSEC;\nDATA;\n"
        )?;
        Ok(Self { out, version, last_id: 0 })
    }

    /// Closes the file.
    pub fn finish(mut self) -> io::Result<()> {
        self.out.write_all(b"ENDSEC;\nEND-ISO-10303-21;\n")?;
        self.out.flush()
    }

    fn record(&mut self, entity: &Entity) -> io::Result<()> {
        let id = entity.id.unwrap_or_else(|| self.new_id());
        let attributes = self.version.schema().attributes(entity.class);
        let unknown = entity.fields.iter().find(|field| !attributes.iter().any(|a| a.name == field.name()));
        assert!(unknown.is_none(), "{} of {:?} has no {unknown:?}", entity.class, self.version);
        write!(self.out, "#{id}={}(", entity.class.to_uppercase())?;
        for (index, attribute) in attributes.iter().enumerate() {
            let value = match entity.fields.iter().find(|field| field.name() == attribute.name) {
                _ if attribute.derived => "*".into(),
                None => "$".into(),
                Some(Field::Simple(_, value)) => simple(value),
                Some(Field::Typed(_, of, value)) => format!("{}({})", of.to_uppercase(), simple(value)),
                Some(Field::One(_, _, link)) => reference(link),
                Some(Field::Many(_, links)) => list(links.iter().map(reference)),
                Some(Field::Inverse { name, .. }) => unreachable!("{name} is taken out before"),
            };
            write!(self.out, "{}{value}", if index > 0 { "," } else { "" })?;
        }
        self.out.write_all(b");\n")
    }
}

impl<W: Write> Sink for Step<W> {
    fn new_id(&mut self) -> u64 {
        self.last_id += 1;
        self.last_id
    }

    fn put(&mut self, mut entity: Entity) -> io::Result<()> {
        hoist(&mut entity, self, Self::record)?;
        self.record(&entity)
    }
}

fn reference(link: &Link) -> String {
    match link {
        Link::To(_, id) => format!("#{id}"),
        Link::Own(owned) => unreachable!("{} is written before", owned.class),
    }
}

fn list(items: impl Iterator<Item = String>) -> String {
    format!("({})", items.collect::<Vec<_>>().join(","))
}

fn simple(value: &Simple) -> String {
    match value {
        Simple::Text(string) => text(string),
        Simple::Real(value) => real(*value),
        Simple::Integer(integer) => integer.to_string(),
        Simple::Truth(truth) => if *truth { ".T." } else { ".F." }.into(),
        Simple::Token(token) => format!(".{token}."),
        Simple::Reals(reals) => list(reals.iter().map(|value| real(*value))),
    }
}

/// A real always has its point.
fn real(value: f64) -> String {
    let plain = number(value);
    if plain.contains('.') { plain } else { plain + "." }
}

/// A string; what is not ASCII by its UTF-16 units.
fn text(string: &str) -> String {
    let mut written = String::from("'");
    for c in string.chars() {
        match c {
            '\'' => written += "''",
            '\\' => written += "\\\\",
            ' '..='~' => written.push(c),
            _ => {
                let units: String = c.encode_utf16(&mut [0; 2]).iter().map(|unit| format!("{unit:04X}")).collect();
                written += &format!("\\X2\\{units}\\X0\\");
            }
        }
    }
    written + "'"
}
