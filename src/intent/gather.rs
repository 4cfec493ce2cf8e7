//! Lines of one or more files become joints, each with its load cases.

use std::collections::{BTreeMap, BTreeSet};

use super::fault::{Faults, ScheduleError};
use super::frame::in_frame;
use super::source::{Source, fold, given, member_key};
use super::{IntendedDetail, Intent, LoadCase, ScheduledJoint, csv_form, toml_form};
use crate::origin::{Place, Problem};
use crate::units::Length;

/// A text of the schedule with its place and its width in characters.
#[derive(Clone, Debug)]
pub(super) struct Stated {
    pub text: String,
    pub at: Place,
    pub width: usize,
}

/// One line: a joint, as far as it is named there, and at most one load case.
#[derive(Clone, Debug)]
pub(super) struct Line {
    pub at: Place,
    pub mark: Option<Stated>,
    pub supporting: Option<Stated>,
    pub supported: Option<Stated>,
    pub end: Option<Stated>,
    pub detail: Option<Stated>,
    /// "7200 mm".
    pub span: Option<Stated>,
    pub braced: Option<Stated>,
    pub class: Option<Stated>,
    pub case: Option<LoadCase>,
}

impl Line {
    pub fn new(at: Place) -> Self {
        Self {
            at,
            mark: None,
            supporting: None,
            supported: None,
            end: None,
            detail: None,
            span: None,
            braced: None,
            class: None,
            case: None,
        }
    }

    /// What tells its joint from others: the mark, else the members and the end.
    fn key(&self) -> [String; 4] {
        let fold_of = |stated: &Option<Stated>| stated.as_ref().map_or(String::new(), |s| fold(&s.text));
        let member = |stated: &Option<Stated>| stated.as_ref().map_or(String::new(), |s| member_key(&s.text));
        match self.mark {
            Some(_) => [fold_of(&self.mark), String::new(), String::new(), String::new()],
            None => [String::new(), member(&self.supporting), member(&self.supported), fold_of(&self.end)],
        }
    }
}

/// Reads one schedule file by itself: CSV or TOML, told by the extension, else by content. `file` names places.
///
/// Details may stand in another file, so nothing is said here about details that are missing or not used: [`merge`]
/// and [`read_all`] do.
///
/// # Errors
/// [`ScheduleError`] with everything that is wrong in the file.
pub fn read(text: &[u8], file: &str) -> Result<Intent, ScheduleError> {
    let mut faults = Faults::default();
    let (source, lines, details) = parse(text, file, &mut faults);
    let joints = if faults.len() == 0 { joints(lines, &mut faults) } else { Vec::new() };
    faults.check(&[source])?;
    Ok(Intent { joints, details, problems: Vec::new() })
}

/// Reads the files of one schedule (name and bytes of each) into one: actions in one, details in the other, for
/// instance. The same as [`read`] and [`merge`], with excerpts of the files in every error.
///
/// # Errors
/// [`ScheduleError`] with everything that is wrong in a file, else between the files.
pub fn read_all(files: &[(&str, &[u8])]) -> Result<Intent, ScheduleError> {
    let mut faults = Faults::default();
    let (mut sources, mut lines, mut details) = (Vec::new(), Vec::new(), Vec::new());
    for (file, text) in files {
        let (source, more_lines, more_details) = parse(text, file, &mut faults);
        sources.push(source);
        lines.extend(more_lines);
        details.extend(more_details);
    }
    let intent = if faults.len() == 0 { join(lines, details, &mut faults) } else { Intent::default() };
    faults.check(&sources)?;
    Ok(intent)
}

/// Joins what was read from the files of one schedule and looks up the details that its joints use. Call it for a
/// schedule of one file too.
///
/// # Errors
/// [`ScheduleError`] without excerpts: a load case of a joint in two files, files that disagree about a joint, a detail
/// that is not defined or defined twice.
pub fn merge(intents: Vec<Intent>) -> Result<Intent, ScheduleError> {
    let mut faults = Faults::default();
    let (mut lines, mut details, mut problems) = (Vec::new(), Vec::new(), Vec::new());
    for intent in intents {
        lines.extend(intent.joints.into_iter().flat_map(lines_of));
        details.extend(intent.details);
        problems.extend(intent.problems);
    }
    let mut intent = join(lines, details, &mut faults);
    faults.check(&[])?;
    problems.append(&mut intent.problems);
    Ok(Intent { problems, ..intent })
}

/// The lines of a file and its details.
fn parse(text: &[u8], file: &str, faults: &mut Faults) -> (Source, Vec<Line>, Vec<IntendedDetail>) {
    let source = Source::new(text, file, faults);
    if faults.len() > 0 {
        return (source, Vec::new(), Vec::new());
    }
    let mut own = Faults::default();
    let (lines, details) = if is_toml(&source) {
        toml_form::lines(&source, &mut own)
    } else {
        (csv_form::lines(&source, &mut own), Vec::new())
    };
    faults.absorb(own);
    (source, lines, details)
}

/// By the extension, else by the first line that is neither blank nor a comment: a table's heading or `key =`.
fn is_toml(source: &Source) -> bool {
    let extension = source.file.rsplit_once('.').map_or(String::new(), |(_, extension)| extension.to_lowercase());
    let first = source.text.lines().map(str::trim).find(|line| !line.is_empty() && !line.starts_with('#'));
    match extension.as_str() {
        "toml" => true,
        "csv" | "tsv" | "txt" => false,
        _ => first.is_some_and(|line| line.starts_with('[') || line.contains('=')),
    }
}

/// A span as its lines hold it.
pub(super) fn written(span: Length) -> String {
    format!("{} mm", span.get())
}

/// A joint as lines again, for joining it with those of another file.
fn lines_of(joint: ScheduledJoint) -> Vec<Line> {
    let stated = |text: Option<String>| text.map(|text| Stated { text, at: joint.at.clone(), width: 1 });
    let line = Line {
        mark: stated(joint.mark),
        supporting: stated(joint.supporting),
        supported: stated(joint.supported),
        end: stated(joint.end),
        detail: stated(joint.detail),
        span: stated(joint.frame.span.map(written)),
        braced: stated(joint.frame.braced.map(|braced| if braced { "braced" } else { "unbraced" }.into())),
        class: stated(joint.frame.class.map(|class| class.word().into())),
        ..Line::new(joint.at.clone())
    };
    let cases = joint.cases.into_iter().map(|case| Line { case: Some(case), ..line.clone() });
    std::iter::once(line.clone()).chain(cases).collect()
}

/// Gathers lines into joints and looks up their details.
fn join(mut lines: Vec<Line>, details: Vec<IntendedDetail>, faults: &mut Faults) -> Intent {
    let mut defined: BTreeMap<String, usize> = BTreeMap::new();
    for (index, detail) in details.iter().enumerate() {
        let first = *defined.entry(fold(&detail.name)).or_insert(index);
        if let (Some(at), Some(other)) = (&detail.at, details.get(first).filter(|_| first != index)) {
            let at_other = other.at.as_ref().map_or(String::new(), |at| format!(" at {at}"));
            let message = format!("the detail {} is defined already{at_other}; allowed is once", given(&detail.name));
            faults.push(at.clone(), 1, message);
        }
    }
    let (mut used, mut undefined) = (BTreeSet::new(), BTreeSet::new());
    for stated in lines.iter_mut().filter_map(|line| line.detail.as_mut()) {
        let name = fold(&stated.text);
        match defined.get(&name).and_then(|index| details.get(*index)) {
            Some(detail) => {
                stated.text.clone_from(&detail.name);
                used.insert(name);
            }
            None if undefined.insert(name) => {
                let names: Vec<&str> = details.iter().map(|detail| detail.name.as_str()).take(20).collect();
                let allowed = if names.is_empty() { "no detail is defined".into() } else { names.join(", ") };
                let message = format!(
                    "the detail {} is not defined; allowed: {allowed} (a [detail.NAME] in schedule.toml defines one)",
                    given(&stated.text)
                );
                faults.push(stated.at.clone(), stated.width, message);
            }
            None => {}
        }
    }
    let unused = details.iter().filter(|detail| !used.contains(&fold(&detail.name)));
    let problems = unused.map(|detail| Problem {
        at: detail.at.clone(),
        message: format!("the detail {} is used by no scheduled joint", given(&detail.name)),
    });
    let problems = problems.collect();
    Intent { joints: joints(lines, faults), details, problems }
}

/// A joint in the making: who stated what, and its cases by folded name.
struct Held {
    line: Line,
    cases: Vec<LoadCase>,
    names: BTreeMap<String, usize>,
}

/// Gathers lines into joints, in the order in which they are first named.
fn joints(lines: Vec<Line>, faults: &mut Faults) -> Vec<ScheduledJoint> {
    let mut held: Vec<Held> = Vec::new();
    let mut by_key: BTreeMap<[String; 4], usize> = BTreeMap::new();
    for mut line in lines {
        let index = *by_key.entry(line.key()).or_insert(held.len());
        if index == held.len() {
            let names = BTreeMap::new();
            held.push(Held { line: Line { case: None, ..line.clone() }, cases: Vec::new(), names });
        }
        let Some(joint) = held.get_mut(index) else { continue };
        agree("supporting", &mut joint.line.supporting, line.supporting.take(), member_key, faults);
        agree("supported", &mut joint.line.supported, line.supported.take(), member_key, faults);
        agree("end", &mut joint.line.end, line.end.take(), fold, faults);
        agree("detail", &mut joint.line.detail, line.detail.take(), fold, faults);
        agree("span", &mut joint.line.span, line.span.take(), fold, faults);
        agree("frame", &mut joint.line.braced, line.braced.take(), fold, faults);
        agree("class", &mut joint.line.class, line.class.take(), fold, faults);
        let Some(case) = line.case.take() else { continue };
        match joint.names.get(&case.name.to_uppercase()).and_then(|index| joint.cases.get(*index)) {
            Some(first) => {
                let (name, place) = (given(&case.name), &first.at);
                let message = format!("load case {name} of this joint is stated already at {place}; allowed is once");
                faults.push(case.at, 1, message);
            }
            None => {
                joint.names.insert(case.name.to_uppercase(), joint.cases.len());
                joint.cases.push(case);
            }
        }
    }
    let text = |stated: Option<Stated>| stated.map(|stated| stated.text);
    let finish = |held: Held| ScheduledJoint {
        mark: text(held.line.mark),
        supporting: text(held.line.supporting),
        supported: text(held.line.supported),
        end: text(held.line.end),
        cases: held.cases,
        detail: text(held.line.detail),
        frame: in_frame(text(held.line.span), text(held.line.braced), text(held.line.class)),
        at: held.line.at,
    };
    held.into_iter().map(finish).collect()
}

/// Lines of one joint must agree; a blank takes what another line states.
fn agree(what: &str, held: &mut Option<Stated>, stated: Option<Stated>, form: fn(&str) -> String, faults: &mut Faults) {
    match (&held, stated) {
        (Some(first), Some(stated)) if form(&first.text) != form(&stated.text) => {
            let (this, other, place) = (given(&stated.text), given(&first.text), &first.at);
            let message =
                format!("{what}: given {this}, but the same joint has {other} at {place}; its lines must agree");
            faults.push(stated.at, stated.width, message);
        }
        (None, Some(stated)) => *held = Some(stated),
        _ => {}
    }
}
