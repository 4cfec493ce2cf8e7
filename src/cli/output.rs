//! Where a report goes: the terminal, a pipe, or a file that is written whole or not at all.

use std::fs;
use std::io::{self, IsTerminal, Write};
use std::path::{Path, PathBuf};

use clap::ValueEnum;
use faying::report::{Options, in_colour};
use tempfile::NamedTempFile;

use super::failure::Failure;
use super::inputs::same;

/// When to colour.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub enum Colour {
    /// On a terminal, unless NO_COLOR is set.
    Auto,
    /// In any case.
    Always,
    /// Never.
    Never,
}

/// Widest text on a terminal; longer lines are hard to follow.
const WIDEST: usize = 140;

/// Where a report goes.
pub struct Output {
    to: To,
    colour: Colour,
}

enum To {
    Stdout,
    /// A device or a pipe with a name: nothing can be renamed onto it.
    Device(PathBuf),
    /// Written beside, renamed when it is whole.
    File {
        beside: NamedTempFile,
        path: PathBuf,
    },
}

impl Output {
    /// Opens the place to write to; `inputs` are files that no report may be written over.
    pub fn open(path: Option<&Path>, colour: Colour, inputs: &[PathBuf]) -> Result<Self, Failure> {
        let Some(path) = path.filter(|path| *path != Path::new("-")) else {
            return Ok(Self { to: To::Stdout, colour });
        };
        if inputs.iter().any(|input| same(input, path)) {
            return Err(Failure::because(format!("can't write {}", path.display()), "it is one of the inputs"));
        }
        let to = match fs::metadata(path) {
            Ok(meta) if meta.is_dir() => {
                return Err(Failure::because(format!("can't write {}", path.display()), "it is a folder"));
            }
            Ok(meta) if !meta.is_file() => To::Device(path.to_owned()),
            _ => To::File { beside: beside(path)?, path: path.to_owned() },
        };
        Ok(Self { to, colour })
    }

    /// How to draw for this place.
    pub fn options(&self, all: bool) -> Options {
        let terminal = matches!(self.to, To::Stdout) && io::stdout().is_terminal();
        let asked = match self.colour {
            Colour::Auto => None,
            Colour::Always => Some(true),
            Colour::Never => Some(false),
        };
        let colour = coloured(asked, terminal);
        let plain = Options::default();
        let width = terminal_size::terminal_size()
            .filter(|_| terminal)
            .map_or(plain.width, |(terminal_size::Width(width), _)| usize::from(width).min(WIDEST));
        Options { width, colour, all }
    }

    /// Lets the report write itself.
    pub fn write(self, report: impl FnOnce(&mut dyn Write) -> io::Result<()>) -> Result<(), Failure> {
        match self.to {
            To::Stdout => to_stdout(report),
            To::Device(path) => {
                let written = fs::OpenOptions::new().write(true).open(&path);
                written.and_then(|mut file| report(&mut file)).map_err(|why| failed(&path, &why))
            }
            To::File { mut beside, path } => {
                report(&mut beside).map_err(|why| failed(&path, &why))?;
                beside.persist(&path).map(|_| ()).map_err(|why| failed(&path, &why.error))
            }
        }
    }
}

/// A new file in the folder of `path`, so that it can be renamed onto it.
fn beside(path: &Path) -> Result<NamedTempFile, Failure> {
    let folder = path.parent().filter(|folder| !folder.as_os_str().is_empty()).unwrap_or(Path::new("."));
    if !folder.is_dir() {
        return Err(Failure::because(format!("can't write {}", path.display()), "its folder does not exist"));
    }
    let mut builder = tempfile::Builder::new();
    builder.prefix(".faying-");
    #[cfg(unix)]
    {
        use std::os::unix::fs::PermissionsExt;
        // A report is for others too: what the umask leaves, as for any new file.
        builder.permissions(fs::Permissions::from_mode(0o666));
    }
    builder.tempfile_in(folder).map_err(|why| failed(path, &why))
}

fn failed(path: &Path, why: &io::Error) -> Failure {
    Failure::io("write", path, why)
}

/// Writes a text to stdout.
pub fn text_to_stdout(text: &str) -> Result<(), Failure> {
    to_stdout(|to| to.write_all(text.as_bytes()))
}

/// Writes to stdout; a reader who has seen enough and closed the pipe is no failure.
fn to_stdout(report: impl FnOnce(&mut dyn Write) -> io::Result<()>) -> Result<(), Failure> {
    let mut stdout = io::stdout().lock();
    match report(&mut stdout).and_then(|()| stdout.flush()) {
        Err(why) if why.kind() != io::ErrorKind::BrokenPipe => Err(Failure::because("can't write the report", why)),
        _ => Ok(()),
    }
}

/// Whether to colour, as asked or as terminal and environment have it.
pub fn coloured(asked: Option<bool>, terminal: bool) -> bool {
    let knows_colour = std::env::var_os("TERM").is_none_or(|term| term != "dumb");
    in_colour(asked, terminal && knows_colour, std::env::var_os("NO_COLOR").as_deref())
}
