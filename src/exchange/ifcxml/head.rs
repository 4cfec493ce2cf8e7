//! The XML attributes of one element, told apart: identity and form on one side, the schema's on the other.

use std::borrow::Cow;

use quick_xml::events::BytesStart;

use super::super::problems::{Problems, Spot};

/// One element's start.
#[derive(Default)]
pub(super) struct Head<'a> {
    /// Local name.
    pub name: Cow<'a, str>,
    pub spot: Spot,
    pub id: Option<Cow<'a, str>>,
    /// Label of the entity it refers to, by `ref` or by `href` into the same document.
    pub reference: Option<Cow<'a, str>>,
    /// What lies in another document.
    pub elsewhere: Option<Cow<'a, str>>,
    pub nil: bool,
    /// `xsi:type` without its prefix.
    pub class: Option<Cow<'a, str>>,
    pub pos: Option<Pos>,
    /// The schema's attributes in the form of XML attributes.
    pub rest: Vec<(Cow<'a, str>, Cow<'a, str>)>,
}

/// Index in a list, and in the row of a list of lists.
pub(super) type Pos = (u32, u32);

impl<'a> Head<'a> {
    /// Reads the start tag.
    ///
    /// # Errors
    /// What is not well-formed about it.
    pub fn read(start: &'a BytesStart<'_>, spot: Spot, problems: &mut Problems) -> Result<Self, String> {
        let mut head = Self { name: local(start.name().as_ref(), spot, problems), spot, ..Self::default() };
        // repeated attributes are found where they are set: the library's own check takes quadratic time
        for attribute in start.attributes().with_checks(false) {
            let attribute = attribute.map_err(|e| e.to_string())?;
            let key = attribute.key.as_ref();
            if key == b"xmlns" || key.starts_with(b"xmlns:") || key.starts_with(b"xml:") {
                continue;
            }
            let name = local(key, spot, problems);
            let value = text(attribute.value, spot, problems);
            match &*name {
                "id" => head.id = Some(value),
                "ref" => head.reference = Some(value),
                "href" => match value.strip_prefix('#') {
                    Some(label) => head.reference = Some(label.to_owned().into()),
                    None => head.elsewhere = Some(value),
                },
                "nil" => head.nil = matches!(value.trim(), "true" | "1"),
                "type" => head.class = Some(value.rsplit(':').next().unwrap_or_default().trim().to_owned().into()),
                "pos" => head.pos = head.position(&value, problems),
                // written for people and schema processors only
                "cType" | "itemType" | "arraySize" | "path" | "extraBits" => {}
                "schemaLocation" | "noNamespaceSchemaLocation" => {}
                _ => head.rest.push((name, value)),
            }
        }
        Ok(head)
    }

    /// Whether it stands for an entity that is defined elsewhere.
    pub fn is_reference(&self) -> bool {
        self.reference.is_some() || self.elsewhere.is_some()
    }

    fn position(&self, text: &str, problems: &mut Problems) -> Option<Pos> {
        let mut numbers = text.split_whitespace().map(str::parse::<u32>);
        let pos = match (numbers.next(), numbers.next(), numbers.next()) {
            (Some(Ok(index)), None, _) => Some((index, 0)),
            (Some(Ok(row)), Some(Ok(index)), None) => Some((row, index)),
            _ => None,
        };
        if pos.is_none() {
            problems.add("pos that is no position", self.spot, || {
                format!("pos=\"{text}\" of {} is no position: one or two whole numbers from 0 are allowed", self.name)
            });
        }
        pos
    }
}

/// The name without its prefix.
fn local<'a>(name: &[u8], spot: Spot, problems: &mut Problems) -> Cow<'a, str> {
    let local = name.rsplit(|&b| b == b':').next().unwrap_or(name);
    match String::from_utf8_lossy(local) {
        Cow::Borrowed(name) => name.to_owned().into(),
        Cow::Owned(name) => {
            not_utf8(spot, problems);
            name.into()
        }
    }
}

/// The text of a piece of XML: decoded, escapes resolved.
pub(super) fn text<'a>(raw: Cow<'a, [u8]>, spot: Spot, problems: &mut Problems) -> Cow<'a, str> {
    let decoded = decode(raw, spot, problems);
    match quick_xml::escape::unescape(&decoded) {
        Ok(Cow::Borrowed(_)) => decoded,
        Ok(Cow::Owned(text)) => text.into(),
        Err(error) => {
            problems.add("escape that is not XML's", spot, || format!("a text is kept as it stands: {error}"));
            decoded
        }
    }
}

/// The text of a piece of XML that has no escapes.
pub(super) fn decode<'a>(raw: Cow<'a, [u8]>, spot: Spot, problems: &mut Problems) -> Cow<'a, str> {
    let decoded = match raw {
        Cow::Borrowed(bytes) => String::from_utf8_lossy(bytes),
        Cow::Owned(bytes) => String::from_utf8_lossy(&bytes).into_owned().into(),
    };
    if decoded.contains(char::REPLACEMENT_CHARACTER) {
        not_utf8(spot, problems);
    }
    decoded
}

fn not_utf8(spot: Spot, problems: &mut Problems) {
    problems.add("text that is not UTF-8", spot, || {
        "a text holds bytes that are not UTF-8; they are read as the replacement character".into()
    });
}
