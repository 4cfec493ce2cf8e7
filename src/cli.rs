//! Commands and their arguments; the only place that touches files, environment and terminal.

mod failure;
mod inputs;
mod output;
mod progress;
mod rules;
mod sheet;

use std::io::{self, Write};
use std::path::{Path, PathBuf};
use std::process::ExitCode;

use clap::{Args, CommandFactory, Parser, Subcommand, ValueEnum};
use faying::report::{json, survey, text};
use faying::review::Review;
use faying::run;

use failure::Failure;
use inputs::Given;
use output::{Colour, Output};
use sheet::SheetArgs;

const EXIT_CODES: &str = "\
Exit codes:
  0  every joint is clear, or deviates and carries (a comment)
  1  at least one joint is on hold: it does not carry what is required, or it is not there
  2  wrong use, or an input that can't be read
  3  nothing is on hold, but something could not be proven (or no joint was found at all)

An aid to review, not a design: local codes, national annexes and a licensed engineer decide.";

const SHEET_EXIT_CODES: &str = "\
Exit codes:
  0  the joint is clear, or deviates and carries (a comment)
  1  the joint is on hold: it does not carry what is required, or it is not there
  2  wrong use, a mark that fits no joint or several, or an input that can't be read
  3  the joint could not be proven
With several joints the worst counts: 1 before 3 before 0.

An aid to review, not a design: local codes, national annexes and a licensed engineer decide.";

const SURVEY_EXIT_CODES: &str = "\
Exit codes:
  0  the model was read, whatever was found in it
  2  wrong use, or an input that can't be read

An aid to review, not a design: local codes, national annexes and a licensed engineer decide.";

/// Lays a steel shop model on the engineer's joint schedule and says which joints do not carry what is required.
///
/// Reads the fabricator's shop model, finds the bolted joints, computes their resistance to EN 1993-1-8 from what was
/// detailed, and compares it with the actions that the schedule requires. What could not be checked is said, never
/// passed over.
#[derive(Debug, Parser)]
#[command(name = "faying", version, after_help = EXIT_CODES, max_term_width = 100)]
struct Cli {
    #[command(subcommand)]
    command: Command,
}

#[derive(Debug, Subcommand)]
enum Command {
    /// Review the joints of a shop model against the schedule.
    ///
    /// Lists what is on hold first, then what could not be proven, what is missing and what deviates but carries.
    #[command(after_help = EXIT_CODES)]
    Review(ReviewArgs),
    /// Say what was recognised in a shop model and what is missing for a full assessment.
    ///
    /// Needs no schedule; ends with what to ask the fabricator for.
    #[command(after_help = SURVEY_EXIT_CODES)]
    Survey(SurveyArgs),
    /// Print the calculation sheet of a joint: sketch, inputs with their origin, every check with formula and clause.
    ///
    /// To be followed by hand, printed and signed. Numbers are rounded for reading and were computed unrounded.
    #[command(after_help = SHEET_EXIT_CODES)]
    Sheet(SheetArgs),
    /// List the rules, or print the page of one: what it finds, why it matters, what to do.
    Rules {
        /// The rule's id, as it stands before a finding: plate-thinner.
        id: Option<String>,
    },
    /// Print the completions of a shell, to be put where that shell looks for them.
    Completions {
        /// The shell.
        shell: clap_complete::Shell,
    },
}

#[derive(Debug, Args)]
struct ReviewArgs {
    /// The shop model (STEP or ifcXML of IFC2X3, IFC4 or IFC4X3, also zipped), or a folder that holds one model and its
    /// schedule.
    ///
    /// In a folder the schedule is called schedule.csv or schedule.toml, or both. Subfolders are not looked at.
    path: PathBuf,
    /// The engineer's schedule (.csv or .toml); may be given more than once. The folder's own is then not used.
    #[arg(long, value_name = "FILE")]
    schedule: Vec<PathBuf>,
    /// Let the exit code be 0 where something is unproven and nothing is on hold.
    #[arg(long)]
    allow_unproven: bool,
    #[command(flatten)]
    common: Common,
}

#[derive(Debug, Args)]
struct SurveyArgs {
    /// The shop model (STEP or ifcXML of IFC2X3, IFC4 or IFC4X3, also zipped), or a folder that holds one.
    #[arg(value_name = "MODEL")]
    path: PathBuf,
    #[command(flatten)]
    common: Common,
}

#[derive(Debug, Args)]
struct Common {
    /// A folder of rule files that stand in for the built-in ones of the same name.
    #[arg(long, value_name = "FOLDER")]
    rules: Option<PathBuf>,
    /// The partial factors and choices of a national annex: a file of annexes/ in the rules, without ".toml".
    #[arg(long, value_name = "NAME")]
    annex: Option<String>,
    /// How to write the report.
    #[arg(long, value_enum, default_value_t = Format::Text)]
    format: Format,
    /// Write the report to a file, whole or not at all.
    #[arg(short, long, value_name = "FILE")]
    output: Option<PathBuf>,
    /// Whether to colour the text; auto colours on a terminal unless NO_COLOR is set.
    #[arg(long, value_enum, default_value_t = Colour::Auto, value_name = "WHEN")]
    color: Colour,
    /// Write long lists out in full.
    #[arg(long)]
    all: bool,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
enum Format {
    /// For people.
    Text,
    /// For programs: one document with a schema and a version.
    Json,
}

/// Where rules come from and a report goes.
struct Places<'a> {
    rules: Option<&'a Path>,
    annex: Option<&'a str>,
    output: Option<&'a Path>,
    color: Colour,
}

impl Common {
    fn places(&self) -> Places<'_> {
        Places {
            rules: self.rules.as_deref(),
            annex: self.annex.as_deref(),
            output: self.output.as_deref(),
            color: self.color,
        }
    }
}

/// Runs the command line and gives the exit code.
pub fn main() -> ExitCode {
    let done = match Cli::parse().command {
        Command::Review(args) => review(&args),
        Command::Survey(args) => survey(&args),
        Command::Sheet(args) => sheet_of(&args),
        Command::Rules { id } => rules::text(id.as_deref()).and_then(|text| output::text_to_stdout(&text)).map(|()| 0),
        Command::Completions { shell } => completions(shell).map(|()| 0),
    };
    ExitCode::from(done.unwrap_or_else(|failure| failure.tell()))
}

fn review(args: &ReviewArgs) -> Result<u8, Failure> {
    let draw = |review: &Review, output: &Output, model: &[u8]| match args.common.format {
        Format::Text => Ok(Drawn::Whole(text::render(review, &output.options(args.common.all), Some(model)))),
        Format::Json => Ok(Drawn::Written(|review, to| json::write_review(review, to))),
    };
    let quotes = matches!(args.common.format, Format::Text);
    let review = report(&args.path, Some(&args.schedule), &args.common.places(), quotes, draw)?;
    let code = review.exit_code();
    // The program ends: the system takes all memory back at once.
    std::mem::forget(review);
    Ok(match code {
        3 if args.allow_unproven => 0,
        code => code,
    })
}

fn survey(args: &SurveyArgs) -> Result<u8, Failure> {
    let draw = |review: &Review, output: &Output, _: &[u8]| match args.common.format {
        Format::Text => Ok(Drawn::Whole(survey::render(review, &output.options(args.common.all)))),
        Format::Json => Ok(Drawn::Written(|review, to| json::write_survey(review, to))),
    };
    report(&args.path, None, &args.common.places(), false, draw).map(std::mem::forget).map(|()| 0)
}

fn sheet_of(args: &SheetArgs) -> Result<u8, Failure> {
    let places = Places {
        rules: args.rules.as_deref(),
        annex: args.annex.as_deref(),
        output: args.output.as_deref(),
        color: args.color,
    };
    let draw = |review: &Review, output: &Output, _: &[u8]| sheet::draw(args, review, output).map(Drawn::Whole);
    let review = report(&args.path, Some(&args.schedule), &places, false, draw)?;
    sheet::exit_code(args, &review)
}

/// A report: in full, or how it is written without ever holding all of it.
enum Drawn {
    Whole(String),
    Written(fn(&Review, &mut dyn Write) -> io::Result<()>),
}

/// Reads, runs, draws and writes; `schedules` is `None` where none is wanted, not even the folder's own;
/// `quotes` says whether the report shows the model's text, which is let go early otherwise.
fn report(
    path: &Path,
    schedules: Option<&[PathBuf]>,
    places: &Places<'_>,
    quotes: bool,
    draw: impl FnOnce(&Review, &Output, &[u8]) -> Result<Drawn, Failure>,
) -> Result<Review, Failure> {
    let mut given = Given::gather(path, schedules, places.rules)?;
    // Before the work is done, so that nobody waits for a report that can't be written.
    let output = Output::open(places.output, places.color, &given.paths)?;
    let gone = (!quotes).then(|| std::mem::take(&mut given.model.bytes));
    let review = progress::watched("reading and checking the model", || match gone {
        Some(bytes) => run::run_letting_go(&given.inputs(), bytes, places.annex),
        None => run::run_by(&given.inputs(), places.annex),
    })?;
    let drawn = draw(&review, &output, &given.model.bytes)?;
    output.write(|to| match drawn {
        Drawn::Whole(text) => to.write_all(text.as_bytes()),
        Drawn::Written(write) => write(&review, to),
    })?;
    Ok(review)
}

fn completions(shell: clap_complete::Shell) -> Result<(), Failure> {
    let mut script = Vec::new();
    clap_complete::generate(shell, &mut Cli::command(), "faying", &mut script);
    output::text_to_stdout(&String::from_utf8_lossy(&script))
}
