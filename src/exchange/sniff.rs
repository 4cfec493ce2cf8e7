//! Tells the forms of an exchange apart by their content.

use std::borrow::Cow;

use quick_xml::events::BytesStart;

use super::problems::{Problems, Spot};
use super::scalar::quoted;

/// The text of a file as UTF-8, without a byte order mark.
///
/// # Errors
/// Why the file is of no form that is read, in one sentence without the file's name.
pub(super) fn decode<'a>(bytes: &'a [u8], problems: &mut Problems) -> Result<Cow<'a, [u8]>, String> {
    if bytes.iter().all(u8::is_ascii_whitespace) {
        return Err("is empty".into());
    }
    if u32::try_from(bytes.len()).is_err() {
        return Err("is larger than 4 GiB, which is not read".into()); // the graph counts in 32 bits
    }
    if bytes.starts_with(b"PK\x03\x04") {
        return Err("is a zip archive; this form is not read yet, take the model out of it".into());
    }
    let text = match bytes {
        [0xEF, 0xBB, 0xBF, rest @ ..] => Cow::Borrowed(rest),
        [0xFF, 0xFE, rest @ ..] => utf16(rest, u16::from_le_bytes).into(),
        [0xFE, 0xFF, rest @ ..] => utf16(rest, u16::from_be_bytes).into(),
        _ => declared(bytes, problems),
    };
    let start = text.trim_ascii_start();
    if !start.starts_with(b"<") && !is_step(&text) {
        let shown = quoted(&String::from_utf8_lossy(&start[..start.len().min(32)]));
        return Err(format!("is no exchange: it starts with {shown}, ifcXML or STEP (ISO-10303-21) is required"));
    }
    Ok(text)
}

/// Whether a text is a STEP physical file: its first word after white space and comments says so.
pub(super) fn is_step(text: &[u8]) -> bool {
    const SIGN: &[u8] = b"ISO-10303-21";
    let mut rest = text.trim_ascii_start();
    while let Some(comment) = rest.strip_prefix(b"/*") {
        let Some(end) = memchr::memmem::find(comment, b"*/") else { return false };
        rest = comment[end + 2..].trim_ascii_start();
    }
    rest.get(..SIGN.len()).is_some_and(|start| start.eq_ignore_ascii_case(SIGN))
}

fn utf16(bytes: &[u8], unit: fn([u8; 2]) -> u16) -> Vec<u8> {
    let units = bytes.chunks(2).map(|pair| unit([pair[0], pair.get(1).copied().unwrap_or_default()]));
    char::decode_utf16(units).map(|c| c.unwrap_or(char::REPLACEMENT_CHARACTER)).collect::<String>().into_bytes()
}

/// The text by the encoding that the XML declaration names; UTF-8 where it names none.
fn declared<'a>(bytes: &'a [u8], problems: &mut Problems) -> Cow<'a, [u8]> {
    let declaration = bytes.strip_prefix(b"<?xml").and_then(|rest| rest.split(|&b| b == b'>').next());
    let Some(encoding) = declaration.and_then(|d| encoding(&String::from_utf8_lossy(d))) else { return bytes.into() };
    match encoding.as_str() {
        "utf-8" | "utf8" | "us-ascii" | "ascii" => bytes.into(),
        "iso-8859-1" | "latin1" => bytes.iter().map(|&b| char::from(b)).collect::<String>().into_bytes().into(),
        other => {
            problems.add("encoding that is not known", Spot { line: 1, column: 1 }, || {
                format!("the encoding {} is not known; UTF-8, UTF-16 and ISO-8859-1 are: read as UTF-8", quoted(other))
            });
            bytes.into()
        }
    }
}

fn encoding(declaration: &str) -> Option<String> {
    let value = declaration.split_once("encoding")?.1.trim_start().strip_prefix('=')?.trim_start();
    let quote = value.chars().next()?;
    Some(value[quote.len_utf8()..].split(quote).next()?.to_ascii_lowercase())
}

/// Schema and form of an XML document by its document element, for people.
///
/// # Errors
/// Why the document is no ifcXML that is read.
pub(super) fn ifcxml_form(root: &BytesStart, spot: Spot, problems: &mut Problems) -> Result<String, String> {
    let name = root.local_name();
    let name = String::from_utf8_lossy(name.as_ref());
    if name == "iso_10303_28" || name == "uos" {
        return Err("is ifcXML by ISO 10303-28 (IFC2X3); this form is not read yet, ifcXML of IFC4 is".into());
    }
    if !name.eq_ignore_ascii_case("ifcxml") {
        let Spot { line, column } = spot;
        return Err(format!(
            "is no exchange: its document element at line {line}, column {column} is {}, ifcXML is required",
            quoted(&name)
        ));
    }
    let namespace = namespace(root);
    let version = version(&namespace);
    if version.is_none() {
        problems.add("namespace that is not known", spot, || {
            format!("the namespace {} names no version of IFC that is known: read as IFC4", quoted(&namespace))
        });
    }
    Ok(format!("{} ifcXML", version.unwrap_or("IFC4")))
}

/// The namespace of the document element; failing that, where its schema is said to lie.
fn namespace(root: &BytesStart) -> String {
    let declares = root.name().prefix().map_or(b"xmlns".to_vec(), |p| [b"xmlns:", p.as_ref()].concat());
    let mut found = String::new();
    for attribute in root.attributes().with_checks(false).flatten() {
        let key = attribute.key.as_ref();
        let value = || String::from_utf8_lossy(&attribute.value).into_owned();
        if key == declares {
            return value();
        }
        if key.ends_with(b":schemaLocation") {
            found = value();
        }
    }
    found
}

/// The version that a namespace names. ADD2 and its corrigendum TC1 do not differ in anything that is read.
fn version(namespace: &str) -> Option<&'static str> {
    let plain: String =
        namespace.chars().filter(|c| c.is_ascii_alphanumeric()).collect::<String>().to_ascii_lowercase();
    const VERSIONS: [(&str, &str); 8] = [
        ("ifc4x1", "IFC4X1"),
        ("ifc4x2", "IFC4X2"),
        ("ifc4x3", "IFC4X3"),
        ("ifc43", "IFC4X3"),
        ("ifc4add2", "IFC4"),
        ("ifc4add1", "IFC4 ADD1"),
        ("ifc4final", "IFC4 (first edition)"),
        ("ifcxml4final", "IFC4 (first edition)"),
    ];
    VERSIONS.iter().find(|(sign, _)| plain.contains(sign)).map(|(_, version)| *version)
}
