//! A zip archive (`.ifczip`): finds the one model in it and inflates it within a limit.

use std::io::{Cursor, Read};

use zip::{CompressionMethod, ZipArchive};

use super::limits::Limits;
use super::problems::{Problems, Spot};
use super::scalar::quoted;

/// Whether bytes are a zip archive: the sign of its first member, of an empty archive or of one cut in parts.
pub(super) fn is_archive(bytes: &[u8]) -> bool {
    [b"PK\x03\x04", b"PK\x05\x06", b"PK\x07\x08"].iter().any(|sign| bytes.starts_with(*sign))
}

/// The name and the bytes of the one model in an archive; a problem names each member that is none.
///
/// # Errors
/// Why no one model can be taken out, in one sentence without the file's name.
pub(super) fn model(bytes: &[u8], limits: Limits, problems: &mut Problems) -> Result<(String, Vec<u8>), String> {
    let damaged = |error: zip::result::ZipError| format!("is a zip archive that is damaged: {error}");
    let mut archive = ZipArchive::new(Cursor::new(bytes)).map_err(damaged)?;
    if archive.has_duplicate_names() {
        return Err("is a zip archive with two members of one name; exactly one model is required".into());
    }
    let mut models = Vec::new();
    for index in 0..archive.len() {
        let entry = archive.by_index_data(index).map_err(damaged)?;
        if entry.is_dir() {
            continue;
        }
        let name = shown(&entry.name().map_err(damaged)?);
        if is_model(&name) {
            models.push((index, name));
        } else {
            problems.add("member that is no model", Spot { line: 1, column: 1 }, || {
                format!("the archive holds {} too, which is not read: only its .ifc or .ifcxml is", quoted(&name))
            });
        }
    }
    let (index, name) = match <[_; 1]>::try_from(models) {
        Ok([model]) => model,
        Err(none) if none.is_empty() => {
            return Err("is a zip archive without a model: exactly one .ifc or .ifcxml is required in it".into());
        }
        Err(several) => {
            return Err(format!(
                "is a zip archive with {} models ({}, {}{}); exactly one .ifc or .ifcxml is required in it",
                several.len(),
                quoted(&several[0].1),
                quoted(&several[1].1),
                if several.len() > 2 { ", …" } else { "" }
            ));
        }
    };
    let model = inflated(&mut archive, index, limits)
        .map_err(|wrong| format!("is a zip archive whose member {name} {wrong}"))?;
    Ok((name, model))
}

/// The bytes of a member. Not more is inflated than the archive states for it, and what it states is limited: so the
/// limit holds whatever it states.
fn inflated(archive: &mut ZipArchive<Cursor<&[u8]>>, index: usize, limits: Limits) -> Result<Vec<u8>, String> {
    let damaged = |error: &dyn std::error::Error| format!("is damaged: {error}");
    let entry = archive.by_index_data(index).map_err(|error| damaged(&error))?;
    let stated = entry.size();
    if entry.encrypted() {
        return Err("is encrypted; a model without a password is required".into());
    }
    if ![CompressionMethod::Stored, CompressionMethod::Deflated].contains(&entry.compression()) {
        return Err("is compressed in a way that is not read; stored and deflated members are".into());
    }
    if stated > limits.inflated {
        return Err(limits.inflates_too_far(stated));
    }
    let member = archive.by_index(index).map_err(|error| damaged(&error))?;
    let mut model = Vec::new();
    let read = member.take(stated + 1).read_to_end(&mut model);
    if model.len() as u64 != stated {
        return Err(format!("is damaged: it does not inflate to the {stated} bytes that the archive states"));
    }
    read.map_err(|error| damaged(&error))?;
    Ok(model)
}

/// A member's name fit for places and messages: slashes as separators, no control characters.
fn shown(name: &str) -> String {
    let plain = |c: char| match c {
        '\\' => '/',
        c if c.is_control() => char::REPLACEMENT_CHARACTER,
        c => c,
    };
    name.chars().map(plain).collect()
}

/// Whether a member is a model by its extension. What starts with a dot is hidden: some systems lay such a file of
/// attributes, with the model's own extension, beside each file of an archive.
fn is_model(name: &str) -> bool {
    let file = name.rsplit('/').next().unwrap_or_default();
    let extension = file.rsplit_once('.').map_or("", |(_, extension)| extension);
    !file.starts_with('.') && ["ifc", "ifcxml"].iter().any(|known| extension.eq_ignore_ascii_case(known))
}
