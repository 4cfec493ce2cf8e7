//! The XML attributes of one element, told apart: identity and form on one side, the schema's on the other.

use std::borrow::Cow;

use quick_xml::events::BytesStart;

use super::super::problems::{Problems, Spot};
use super::super::source::Source;

/// One element's start; all of it stands in the document, of which nothing is copied that has no escapes.
#[derive(Default)]
pub(super) struct Head<'x> {
    /// Local name.
    pub name: Cow<'x, str>,
    pub spot: Spot,
    pub id: Option<Cow<'x, str>>,
    /// Label of the entity it refers to, by `ref` or by `href` into the same document.
    pub reference: Option<Cow<'x, str>>,
    /// What lies in another document.
    pub elsewhere: Option<Cow<'x, str>>,
    pub nil: bool,
    /// `xsi:type` without its prefix.
    pub class: Option<Cow<'x, str>>,
    pub pos: Option<Pos>,
    /// The schema's attributes in the form of XML attributes, the values as they are written.
    pub rest: Vec<(Cow<'x, str>, &'x [u8])>,
}

/// Index in a list, and in the row of a list of lists.
pub(super) type Pos = (u32, u32);

impl<'x> Head<'x> {
    /// Reads the start tag, which stands in `document`, into what was another one's head.
    ///
    /// # Errors
    /// What is not well-formed about it.
    pub fn read(
        &mut self,
        document: Source<'x>,
        start: &BytesStart,
        spot: Spot,
        problems: &mut Problems,
    ) -> Result<(), String> {
        let lasting = |piece: &[u8]| within(document, piece).ok_or_else(|| "it can't be followed".to_owned());
        // repeated attributes are found where they are set: the library's own check takes quadratic time
        let mut attributes = start.attributes();
        let attributes = attributes.with_checks(false).map(|attribute| {
            let attribute = attribute.map_err(|e| e.to_string())?;
            Ok((lasting(attribute.key.as_ref())?, lasting(&attribute.value)?))
        });
        self.fill(document, lasting(start.name().as_ref())?, attributes, spot, problems)
    }

    /// Tells a start tag's attributes apart; in what was another one's head.
    ///
    /// # Errors
    /// The first of an attribute.
    pub fn fill<E>(
        &mut self,
        document: Source<'x>,
        name: &'x [u8],
        attributes: impl Iterator<Item = Result<(&'x [u8], &'x [u8]), E>>,
        spot: Spot,
        problems: &mut Problems,
    ) -> Result<(), E> {
        self.name = local(document, name, spot, problems);
        self.spot = spot;
        (self.id, self.reference, self.elsewhere, self.class) = (None, None, None, None);
        (self.nil, self.pos) = (false, None);
        self.rest.clear();
        for attribute in attributes {
            let (key, raw) = attribute?;
            if key.starts_with(b"xml")
                && (key.len() == 5 && key == b"xmlns" || matches!(&key[3..], [b'n', b's', b':', ..] | [b':', ..]))
            {
                continue;
            }
            let name = local(document, key, spot, problems);
            match &*name {
                "id" => self.id = Some(text(document, raw, spot, problems)),
                "ref" => self.reference = Some(text(document, raw, spot, problems)),
                "href" => match cut(text(document, raw, spot, problems), |href| href.strip_prefix('#')) {
                    Ok(label) => self.reference = Some(label),
                    Err(href) => self.elsewhere = Some(href),
                },
                "nil" => self.nil = matches!(raw.trim_ascii(), b"true" | b"1"),
                "type" => {
                    let class =
                        cut(text(document, raw, spot, problems), |class| class.rsplit(':').next().map(str::trim));
                    self.class = Some(class.unwrap_or_else(|class| class));
                }
                "pos" => self.pos = self.position(&text(document, raw, spot, problems), problems),
                // written for people and schema processors only
                "cType" | "itemType" | "arraySize" | "path" | "extraBits" => {}
                "schemaLocation" | "noNamespaceSchemaLocation" => {}
                _ => self.rest.push((name, raw)),
            }
        }
        Ok(())
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

/// The same bytes, seen as part of the document in which they lie: the library's events do not outlast themselves.
pub(super) fn within<'x>(document: Source<'x>, piece: &[u8]) -> Option<&'x [u8]> {
    let start = document.offset(piece)?;
    document.bytes.get(start..start + piece.len())
}

/// A part of a text without a copy where it is borrowed; the text itself where it has no such part.
fn cut<'x>(
    text: Cow<'x, str>,
    part: impl for<'a> Fn(&'a str) -> Option<&'a str>,
) -> Result<Cow<'x, str>, Cow<'x, str>> {
    match text {
        Cow::Borrowed(text) => part(text).map(Cow::Borrowed).ok_or(text.into()),
        Cow::Owned(text) => match part(&text) {
            Some(part) => Ok(part.to_owned().into()),
            None => Err(text.into()),
        },
    }
}

/// The name without its prefix.
fn local<'x>(document: Source<'x>, name: &'x [u8], spot: Spot, problems: &mut Problems) -> Cow<'x, str> {
    let local = match name.iter().rposition(|&b| b == b':') {
        Some(colon) => &name[colon + 1..],
        None => name,
    };
    if let Some(local) = document.text(local) {
        return local.into();
    }
    not_utf8(spot, problems);
    String::from_utf8_lossy(local)
}

/// The text of a piece of XML that needs no decoding; `None` where it may need some.
pub(super) fn plain<'b, 'x: 'b>(document: Source<'x>, raw: &'b [u8]) -> Option<&'b str> {
    // EF starts the replacement character; looking at all bytes is quicker than stopping at the first
    if raw.iter().fold(false, |any, b| any | (*b == b'&') | (*b == 0xEF)) { None } else { document.text(raw) }
}

/// The text of a piece of XML: decoded, escapes resolved.
pub(super) fn text<'b, 'x: 'b>(
    document: Source<'x>,
    raw: &'b [u8],
    spot: Spot,
    problems: &mut Problems,
) -> Cow<'b, str> {
    if let Some(text) = plain(document, raw) {
        return text.into();
    }
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
pub(super) fn decode<'x>(raw: &'x [u8], spot: Spot, problems: &mut Problems) -> Cow<'x, str> {
    let decoded = String::from_utf8_lossy(raw);
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
