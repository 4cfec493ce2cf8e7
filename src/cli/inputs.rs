//! Finds and reads the inputs: the model, its schedules, the rule files.

use std::ffi::OsStr;
use std::fs;
use std::path::{Path, PathBuf};

use faying::run::Inputs;

use super::failure::{self, Failure};

/// What counts as a shop model in a folder, by extension.
const MODELS: [&str; 3] = ["ifcxml", "ifc", "ifczip"];

/// What a folder's schedules are called, in the order in which they are read.
const SCHEDULES: [&str; 2] = ["schedule.csv", "schedule.toml"];

/// How deep a rule folder is looked into; the built-in one is two deep.
const RULE_DEPTH: usize = 4;

/// A file as the caller named it, and what it holds.
pub struct File {
    /// For places and sentences; never an absolute path.
    pub name: String,
    /// Its bytes.
    pub bytes: Vec<u8>,
}

/// Everything that was given.
pub struct Given {
    /// The shop model.
    pub model: File,
    /// The schedules.
    schedules: Vec<File>,
    /// Rule files: name inside the folder, text.
    rules: Vec<(String, String)>,
    /// Where all of them lie, so that no report is written over an input.
    pub paths: Vec<PathBuf>,
}

impl Given {
    /// Reads everything; `schedules` is `None` where not even a folder's own is wanted.
    pub fn gather(path: &Path, schedules: Option<&[PathBuf]>, rules: Option<&Path>) -> Result<Self, Failure> {
        let (model, own) = if path.is_dir() { in_folder(path)? } else { (path.to_owned(), Vec::new()) };
        let schedules = match schedules {
            None => Vec::new(),
            Some([]) => own,
            Some(named) => {
                for unused in own.iter().filter(|own| !named.iter().any(|given| same(given, own))) {
                    failure::say(&format!("{} is not used, because --schedule was given", unused.display()));
                }
                named.to_vec()
            }
        };
        let mut given = Self {
            model: read("read the model", &model)?,
            schedules: schedules.iter().map(|path| read("read the schedule", path)).collect::<Result<_, _>>()?,
            rules: Vec::new(),
            paths: std::iter::once(model).chain(schedules).collect(),
        };
        if let Some(folder) = rules {
            let mut found = Vec::new();
            rule_files(folder, RULE_DEPTH, &mut found)?;
            if found.is_empty() {
                return Err(Failure::because(folder.display(), "the rule folder holds no .toml or .csv file"));
            }
            for path in &found {
                let bytes = fs::read(path).map_err(|why| Failure::io("read the rule file", path, &why))?;
                let text = String::from_utf8(bytes)
                    .map_err(|_| Failure::because(path.display(), "a rule file must be UTF-8 text"))?;
                given.rules.push((slashed(path.strip_prefix(folder).unwrap_or(path)), text));
            }
            given.paths.extend(found);
        }
        Ok(given)
    }

    /// The same, borrowed.
    pub fn inputs(&self) -> Inputs<'_> {
        Inputs {
            model: (&self.model.name, &self.model.bytes),
            schedules: self.schedules.iter().map(|file| (file.name.as_str(), file.bytes.as_slice())).collect(),
            rules: self.rules.iter().map(|(name, text)| (name.as_str(), text.as_str())).collect(),
        }
    }
}

/// The one model of a folder and its schedules.
fn in_folder(folder: &Path) -> Result<(PathBuf, Vec<PathBuf>), Failure> {
    let files: Vec<PathBuf> = listed(folder, "read the folder")?.into_iter().filter(|path| path.is_file()).collect();
    let is_model = |path: &&PathBuf| has_extension(path, &MODELS);
    let models: Vec<&PathBuf> = files.iter().filter(is_model).collect();
    let schedules = SCHEDULES
        .iter()
        .filter_map(|name| files.iter().find(|path| path.file_name() == Some(OsStr::new(name))))
        .cloned()
        .collect();
    match models.as_slice() {
        [one] => Ok(((*one).clone(), schedules)),
        [] => Err(Failure::because(
            folder.display(),
            "the folder holds no shop model (.ifcxml, .ifc or .ifczip; subfolders are not looked at)",
        )),
        many => {
            let names: Vec<String> =
                many.iter().filter_map(|path| path.file_name()).map(|n| n.to_string_lossy().into_owned()).collect();
            Err(Failure::because(
                folder.display(),
                format!("the folder must hold one shop model and holds {}: {}", many.len(), names.join(", ")),
            ))
        }
    }
}

/// What a folder holds, sorted, without hidden files.
fn listed(folder: &Path, what: &str) -> Result<Vec<PathBuf>, Failure> {
    let told = |why: std::io::Error| Failure::io(what, folder, &why);
    let mut paths = fs::read_dir(folder)
        .map_err(told)?
        .map(|entry| entry.map(|entry| entry.path()))
        .collect::<Result<Vec<PathBuf>, _>>()
        .map_err(told)?;
    paths.retain(|path| path.file_name().is_some_and(|name| !name.to_string_lossy().starts_with('.')));
    paths.sort();
    Ok(paths)
}

fn rule_files(folder: &Path, depth: usize, found: &mut Vec<PathBuf>) -> Result<(), Failure> {
    for path in listed(folder, "read the rule folder")? {
        if path.is_dir() && depth > 1 {
            rule_files(&path, depth - 1, found)?;
        } else if path.is_file() && has_extension(&path, &["toml", "csv"]) {
            found.push(path);
        }
    }
    Ok(())
}

fn has_extension(path: &Path, allowed: &[&str]) -> bool {
    path.extension().is_some_and(|own| allowed.iter().any(|one| own.eq_ignore_ascii_case(one)))
}

fn read(what: &str, path: &Path) -> Result<File, Failure> {
    let bytes = fs::read(path).map_err(|why| Failure::io(what, path, &why))?;
    // An absolute path would make the same review differ from one machine to the next.
    let name = if path.is_absolute() { Path::new(path.file_name().unwrap_or_default()) } else { path };
    Ok(File { name: slashed(name), bytes })
}

/// A path with forward slashes, without a leading "./".
fn slashed(path: &Path) -> String {
    let text = path.to_string_lossy().replace(std::path::MAIN_SEPARATOR, "/");
    text.strip_prefix("./").map_or(text.clone(), str::to_owned)
}

/// Whether both are the same file.
pub fn same(a: &Path, b: &Path) -> bool {
    match (fs::canonicalize(a), fs::canonicalize(b)) {
        (Ok(a), Ok(b)) => a == b,
        _ => false,
    }
}
