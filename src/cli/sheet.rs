//! The calculation sheet of single joints: which ones are meant, and what the exit code says of them.

use std::path::PathBuf;

use clap::{Args, ValueEnum};
use faying::report::sheet;
use faying::review::{JointReview, Outcome, Review};

use super::failure::Failure;
use super::output::{Colour, Output};

/// How many marks stand in a refusal.
const NAMED: usize = 12;

#[derive(Debug, Args)]
pub struct SheetArgs {
    /// The shop model, or a folder that holds one model and its schedule, as for review.
    pub path: PathBuf,
    /// The joint: its mark in the review, or the mark or GlobalId of a part that no other joint has; may be given more
    /// than once.
    #[arg(long, required = true, value_name = "MARK")]
    joint: Vec<String>,
    /// The engineer's schedule (.csv or .toml); may be given more than once. The folder's own is then not used.
    #[arg(long, value_name = "FILE")]
    pub schedule: Vec<PathBuf>,
    /// A folder of rule files that stand in for the built-in ones of the same name.
    #[arg(long, value_name = "FOLDER")]
    pub rules: Option<PathBuf>,
    /// The partial factors and choices of a national annex: a file of annexes/ in the rules, without ".toml".
    #[arg(long, value_name = "NAME")]
    pub annex: Option<String>,
    /// How to write the sheet.
    #[arg(long, value_enum, default_value_t = Format::Text)]
    format: Format,
    /// Write the sheet to a file, whole or not at all.
    #[arg(short, long, value_name = "FILE")]
    pub output: Option<PathBuf>,
    /// Whether to colour the text; auto colours on a terminal unless NO_COLOR is set.
    #[arg(long, value_enum, default_value_t = Colour::Auto, value_name = "WHEN")]
    pub color: Colour,
    /// Let the exit code be 0 where something is unproven and nothing is on hold.
    #[arg(long)]
    allow_unproven: bool,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
enum Format {
    /// For the terminal.
    Text,
    /// One page with the sketch, to be read on a screen or printed on A4.
    Html,
}

/// Draws the sheets that were asked for.
pub fn draw(args: &SheetArgs, review: &Review, output: &Output) -> Result<String, Failure> {
    let joints = chosen(args, review)?;
    Ok(match args.format {
        Format::Text => sheet::text(review, &joints, &output.options(true)),
        Format::Html => sheet::html(review, &joints),
    })
}

/// The exit code: that of a review of nothing but these joints.
pub fn exit_code(args: &SheetArgs, review: &Review) -> Result<u8, Failure> {
    let worst = chosen(args, review)?.iter().map(|joint| joint.outcome).min();
    Ok(match worst {
        Some(Outcome::Hold) => 1,
        Some(Outcome::Unproven) if !args.allow_unproven => 3,
        _ => 0,
    })
}

/// The joints that are meant, each once, in the order in which they were asked for.
fn chosen<'a>(args: &SheetArgs, review: &'a Review) -> Result<Vec<&'a JointReview>, Failure> {
    let mut chosen: Vec<&JointReview> = Vec::new();
    for asked in &args.joint {
        let joint = find(asked, &review.joints)?;
        if !chosen.iter().any(|other| std::ptr::eq(*other, joint)) {
            chosen.push(joint);
        }
    }
    Ok(chosen)
}

/// What a joint may be called by, the surest first.
type Called = fn(&JointReview, &str) -> bool;

fn find<'a>(asked: &str, joints: &'a [JointReview]) -> Result<&'a JointReview, Failure> {
    let ways: [Called; 3] = [
        |joint, asked| joint.mark == asked,
        |joint, asked| parts(joint).any(|(guid, mark)| guid == asked || mark == Some(asked)),
        |joint, asked| bare(&joint.mark) == bare(asked),
    ];
    for way in ways {
        let fitting: Vec<&JointReview> = joints.iter().filter(|joint| way(joint, asked)).collect();
        match fitting.as_slice() {
            [] => {}
            [one] => return Ok(one),
            several => {
                let marks: Vec<String> = several.iter().map(|joint| called(joint)).collect();
                return Err(Failure::new(format!(
                    "{asked:?} fits {} joints: {}; --joint takes one of these, or the GlobalId of a part that only one has",
                    several.len(),
                    listed(&marks)
                )));
            }
        }
    }
    let marks: Vec<&str> = joints.iter().map(|joint| joint.mark.as_str()).collect();
    let near = similar::get_close_matches(asked, &marks, 3, 0.5);
    let (lead, marks) = if near.is_empty() { ("there are", marks) } else { ("near it", near) };
    let hint = match marks.is_empty() {
        true => "no joint was found in the model or the schedule".into(),
        false => format!("{lead}: {}", listed(&marks)),
    };
    Err(Failure::new(format!("no joint is called {asked:?}; {hint}")))
}

/// Mark and end plate, for joints that share a mark.
fn called(joint: &JointReview) -> String {
    match joint.plates.first() {
        Some(plate) => format!("{} (plate {})", joint.mark, plate.guid),
        None => joint.mark.clone(),
    }
}

/// GlobalIds and marks of a joint's parts.
fn parts(joint: &JointReview) -> impl Iterator<Item = (&str, Option<&str>)> {
    let members = joint.supported.iter().chain(&joint.supporting).map(|part| (&part.guid, &part.mark));
    let plates = joint.plates.iter().map(|part| (&part.guid, &part.mark));
    members.chain(plates).map(|(guid, mark)| (guid.as_str(), mark.as_deref()))
}

/// Without case and spaces.
fn bare(mark: &str) -> String {
    mark.chars().filter(|c| !c.is_whitespace()).flat_map(char::to_lowercase).collect()
}

fn listed<S: AsRef<str>>(marks: &[S]) -> String {
    // A mark may hold what would steer a terminal.
    let shown = |mark: &S| mark.as_ref().chars().map(|c| if c.is_control() { ' ' } else { c }).collect::<String>();
    let named: Vec<String> = marks.iter().take(NAMED).map(shown).collect();
    match marks.len().saturating_sub(NAMED) {
        0 => named.join(", "),
        more => format!("{} and {more} more", named.join(", ")),
    }
}
