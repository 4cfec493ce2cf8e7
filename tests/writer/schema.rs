//! The attributes of each class by position, from the program's own schema tables. That these are right is not for this
//! writer to say: a validator of the standard's own rules does, and the tests of the reader.

use std::collections::BTreeMap;

/// The entities of one version.
pub struct Schema {
    classes: BTreeMap<&'static str, Vec<Attribute>>,
}

/// An explicit attribute.
#[derive(Clone)]
pub struct Attribute {
    /// Its EXPRESS name.
    pub name: &'static str,
    /// Whether a subtype derives it, so that no form states it.
    pub derived: bool,
}

impl Schema {
    /// Reads a table; its own head says how it is written.
    pub fn parse(table: &'static str) -> Self {
        let mut classes: BTreeMap<&str, Vec<Attribute>> = BTreeMap::new();
        for line in table.lines().filter(|line| !line.starts_with(['#', '=']) && !line.is_empty()) {
            let (head, items) = line.split_once(' ').unwrap_or((line, ""));
            let (name, parent) = head.trim_start_matches('*').split_once('<').unwrap_or((head, ""));
            let mut attributes = classes.get(parent).cloned().unwrap_or_default();
            for item in items.split_ascii_whitespace() {
                if let Some(derived) = item.strip_prefix('-') {
                    attributes.iter_mut().filter(|a| a.name == derived).for_each(|a| a.derived = true);
                } else if let Some((name, _)) = item.split_once(':') {
                    attributes.push(Attribute { name, derived: false });
                }
            }
            classes.insert(name.trim_start_matches('*'), attributes);
        }
        Self { classes }
    }

    /// The attributes of a class, from the root down.
    pub fn attributes(&self, class: &str) -> &[Attribute] {
        self.classes.get(class).unwrap_or_else(|| panic!("{class} is no entity of this version"))
    }
}
