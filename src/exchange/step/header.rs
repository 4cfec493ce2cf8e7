//! Which schema the header names.

use super::super::Entities;
use super::super::problems::Spot;
use super::super::scalar::quoted;
use super::super::schema::Schema;
use super::Reader;

impl Reader<'_> {
    /// Reads `FILE_SCHEMA(('IFC4'))` after its first word and takes the tables of that schema.
    ///
    /// # Errors
    /// The schema is none of IFC.
    pub(super) fn file_schema(&mut self, spot: Spot) -> Result<(), String> {
        let mut names = Vec::new();
        while let Some(byte @ (b'(' | b'\'' | b',')) = self.cursor.peek() {
            if byte != b'\'' {
                self.cursor.at += 1;
            } else if let Some(text) = self.cursor.string() {
                // an object identifier may follow: 'IFC4 {1 0 10303 …}'
                let name = super::text::decode(text.raw, self.cursor.source.text(text.raw)).text;
                names.push(name.split_whitespace().next().unwrap_or_default().to_ascii_uppercase());
            }
        }
        let Some((name, (schema, is_same))) = names.iter().find_map(|name| Some((name, schema(name)?))) else {
            let shown = quoted(&names.join(", "));
            let Spot { line, column } = spot;
            return Err(format!(
                "is STEP of the schema {shown} at line {line}, column {column}; IFC2X3, IFC4 and IFC4X3 are read"
            ));
        };
        if !is_same {
            self.problems.add("schema that is not known", spot, || {
                format!("the schema {} has no tables here: read as {}", quoted(name), schema.name)
            });
        }
        if !self.entities.is_empty() {
            self.problems.add("schema named too late", spot, || {
                format!("the schema is named after the first record: read as {}", self.schema.name)
            });
            return Ok(());
        }
        self.schema = schema;
        self.entities = Entities::new(schema, self.entities.file());
        Ok(())
    }
}

/// The tables by which a schema is read, and whether they are its own. Corrigenda and addenda of one version do not
/// differ in anything that is read.
fn schema(name: &str) -> Option<(&'static Schema, bool)> {
    let (schema, is_same) = match name {
        "IFC4" | "IFC4_ADD1" | "IFC4_ADD2" | "IFC4_ADD2_TC1" => (Schema::ifc4(), true),
        "IFC2X3" | "IFC2X3_TC1" | "IFC2X3_FINAL" => (Schema::ifc2x3(), true),
        "IFC4X3" | "IFC4X3_TC1" | "IFC4X3_ADD1" | "IFC4X3_ADD2" => (Schema::ifc4x3(), true),
        _ if name.starts_with("IFC4X3") => (Schema::ifc4x3(), false),
        _ if name.starts_with("IFC4") => (Schema::ifc4(), false),
        _ if name.starts_with("IFC2X") => (Schema::ifc2x3(), false),
        _ => return None,
    };
    Some((schema, is_same))
}
