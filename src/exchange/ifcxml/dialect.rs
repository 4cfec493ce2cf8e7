//! Tells the dialects of ifcXML apart by the elements around the entities. Only local names count for what an element
//! is; namespaces, of which several families are in use for the same thing, only for the version of the schema.

use quick_xml::events::BytesStart;
use quick_xml::events::attributes::Attribute;

use super::super::problems::{Problems, Spot};
use super::super::scalar::quoted;
use super::super::schema::Schema;

/// What an element around the entities is.
pub(super) enum Around {
    /// `iso_10303_28`: holds one or more `uos`.
    Envelope,
    /// `ifcXML` or `uos`: holds the entities, which are of that schema.
    Entities(&'static Schema),
    /// Nothing that is read, such as a header.
    Other,
}

/// Schema and form, as they become known element by element.
#[derive(Default)]
pub(super) struct Dialect {
    /// Schema and form for people, once the element that holds the entities has started.
    pub form: Option<String>,
    /// Namespaces that the document element declares, by their prefix.
    declared: Vec<(Vec<u8>, String)>,
    /// What names the schema in the envelope beside `uos`.
    clues: Vec<String>,
    schema: Option<&'static Schema>,
}

impl Dialect {
    /// An element outside the entities starts; `is_root` says whether it is the document element.
    ///
    /// # Errors
    /// Why the document is no ifcXML.
    pub fn start(
        &mut self,
        element: &BytesStart,
        is_root: bool,
        spot: Spot,
        problems: &mut Problems,
    ) -> Result<Around, String> {
        let name = element.local_name();
        let name = String::from_utf8_lossy(name.as_ref());
        match &*name {
            "iso_10303_28" if is_root => {
                self.declared = declarations(element);
                Ok(Around::Envelope)
            }
            "uos" => Ok(Around::Entities(self.settle(element, Schema::ifc2x3(), spot, problems))),
            _ if name.eq_ignore_ascii_case("ifcxml") => {
                Ok(Around::Entities(self.settle(element, Schema::ifc4(), spot, problems)))
            }
            _ if is_root => {
                let Spot { line, column } = spot;
                Err(format!(
                    "is no exchange: its document element at line {line}, column {column} is {}, ifcXML is required",
                    quoted(&name)
                ))
            }
            "express" => {
                self.clues.extend(attribute(element, "schema_name"));
                Ok(Around::Other)
            }
            "iso_10303_28_header" | "schema_population" | "configuration" => Ok(Around::Other),
            _ => {
                problems.add("element that is not understood", spot, || {
                    format!("{name} is not read: a header and uos are allowed here")
                });
                Ok(Around::Other)
            }
        }
    }

    /// The schema of the entities in an element; where nothing names a known one it is `otherwise`.
    fn settle(
        &mut self,
        element: &BytesStart,
        otherwise: &'static Schema,
        spot: Spot,
        problems: &mut Problems,
    ) -> &'static Schema {
        let prefix = element.name().prefix().map_or(Vec::new(), |p| p.as_ref().to_vec());
        let mut declared = declarations(element).into_iter().chain(self.declared.iter().cloned());
        let namespace = declared.find(|(of, _)| *of == prefix).map(|(_, namespace)| namespace);
        let told = ["configuration", "schemaLocation"].map(|name| attribute(element, name));
        let clues = namespace.iter().chain(&self.clues).chain(told.iter().flatten());
        // in the wild the document element may declare an older version than its uos is of
        let mut versions: Vec<_> = clues.filter_map(|clue| version(clue)).collect();
        versions.sort_by_key(|version| !version.is_exact());
        let version = versions.first().copied().unwrap_or_else(|| {
            problems.add("namespace that is not known", spot, || {
                let given = quoted(namespace.as_deref().unwrap_or_default());
                format!("the namespace {given} names no version of IFC that is known: read as {}", otherwise.name)
            });
            Version { name: otherwise.name, schema: otherwise }
        });
        let schema = self.schema.unwrap_or(version.schema); // one graph is of one schema
        if !version.is_exact() || !std::ptr::eq(schema, version.schema) {
            problems.add("version that is not known", spot, || {
                format!("the entities are of {}, which is read as {}", version.name, schema.name)
            });
        }
        self.schema = Some(schema);
        self.form.get_or_insert_with(|| format!("{} ifcXML", version.name));
        schema
    }
}

/// A version of the schema.
#[derive(Clone, Copy)]
struct Version {
    /// For people.
    name: &'static str,
    /// By which it is read.
    schema: &'static Schema,
}

impl Version {
    /// Whether all of it is in the schema by which it is read. Editions of one version differ in nothing that is read
    /// but in where relations stand, and any place is understood in all of them.
    fn is_exact(self) -> bool {
        self.name.split(' ').next() == Some(self.schema.name)
    }
}

/// The version that a namespace or a schema's name tells.
fn version(namespace: &str) -> Option<Version> {
    let plain: String =
        namespace.chars().filter(|c| c.is_ascii_alphanumeric()).collect::<String>().to_ascii_lowercase();
    type Table = fn() -> &'static Schema;
    const VERSIONS: [(&str, &str, Table); 10] = [
        ("ifc2x3", "IFC2X3", Schema::ifc2x3),
        ("ifc2x2", "IFC2X2", Schema::ifc2x3),
        ("ifc4x1", "IFC4X1", Schema::ifc4),
        ("ifc4x2", "IFC4X2", Schema::ifc4),
        ("ifc4x3", "IFC4X3", Schema::ifc4x3),
        ("ifc43", "IFC4X3", Schema::ifc4x3),
        ("ifc4add2", "IFC4", Schema::ifc4),
        ("ifc4add1", "IFC4 ADD1", Schema::ifc4),
        ("ifc4final", "IFC4 (first edition)", Schema::ifc4),
        ("ifcxml4final", "IFC4 (first edition)", Schema::ifc4),
    ];
    let (_, name, schema) = VERSIONS.iter().find(|(sign, ..)| plain.contains(sign))?;
    Some(Version { name, schema: schema() })
}

/// The namespaces that an element declares, by their prefix (empty for the one without).
fn declarations(element: &BytesStart) -> Vec<(Vec<u8>, String)> {
    let declaration = |attribute: Attribute| {
        let prefix = match attribute.key.as_ref() {
            b"xmlns" => b"".as_slice(),
            key => key.strip_prefix(b"xmlns:")?,
        };
        Some((prefix.to_vec(), String::from_utf8_lossy(&attribute.value).into_owned()))
    };
    element.attributes().with_checks(false).flatten().filter_map(declaration).collect()
}

/// The value of an attribute by its local name.
fn attribute(element: &BytesStart, name: &str) -> Option<String> {
    let is_it = |attribute: &Attribute| attribute.key.local_name().as_ref() == name.as_bytes();
    let found = element.attributes().with_checks(false).flatten().find(is_it)?;
    Some(String::from_utf8_lossy(&found.value).into_owned())
}
