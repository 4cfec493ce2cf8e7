//! The page a text is written on: wrapping, indents, colour, and no control characters from files.

use std::cell::Cell;

use anstyle::{AnsiColor, Style};
use textwrap::{WordSeparator, WordSplitter};

use super::Options;
use crate::review::CAUTION;

/// How a line is meant.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Tone {
    Plain,
    Heading,
    Hold,
    Unproven,
    Comment,
    Quiet,
}

impl Tone {
    fn style(self) -> Style {
        match self {
            Self::Plain => Style::new(),
            Self::Heading => Style::new().bold(),
            Self::Hold => AnsiColor::Red.on_default().bold(),
            Self::Unproven => AnsiColor::Yellow.on_default().bold(),
            Self::Comment => AnsiColor::Cyan.on_default().bold(),
            Self::Quiet => Style::new().dimmed(),
        }
    }
}

/// How many marks or GlobalIds stand in a list that is not written out.
const LISTED: usize = 12;

/// The narrowest page that is still wrapped to.
const NARROWEST: usize = 40;

/// A page under way.
pub(super) struct Page {
    out: String,
    options: Options,
    /// Whether anything was left out.
    cut: Cell<bool>,
}

impl Page {
    pub(super) fn new(options: &Options) -> Self {
        Self {
            out: String::new(),
            options: Options { width: options.width.max(NARROWEST), ..*options },
            cut: Cell::new(false),
        }
    }

    /// Ends the page with the caution, and says so where lists were cut short.
    pub(super) fn finish(mut self) -> String {
        self.blank();
        if self.cut.get() {
            self.toned(0, Tone::Quiet, "Long lists are cut short; --all shows them in full.");
        }
        self.line(0, CAUTION);
        self.out
    }

    /// Ends a page that says its cautions itself and is not cut short.
    pub(super) fn end(self) -> String {
        self.out
    }

    pub(super) fn options(&self) -> &Options {
        &self.options
    }

    /// A heading with an empty line before it.
    pub(super) fn heading(&mut self, text: &str) {
        if !self.out.is_empty() {
            self.out.push('\n');
        }
        self.toned(0, Tone::Heading, text);
    }

    pub(super) fn blank(&mut self) {
        self.out.push('\n');
    }

    /// A paragraph, wrapped; what runs on is indented by two more.
    pub(super) fn line(&mut self, indent: usize, text: &str) {
        self.toned(indent, Tone::Plain, text);
    }

    /// A paragraph in a tone.
    pub(super) fn toned(&mut self, indent: usize, tone: Tone, text: &str) {
        self.wrapped(tone, &" ".repeat(indent), &" ".repeat(indent + 2), text);
    }

    fn wrapped(&mut self, tone: Tone, first: &str, next: &str, text: &str) {
        let options = textwrap::Options::new(self.options.width)
            .initial_indent(first)
            .subsequent_indent(next)
            .word_separator(WordSeparator::AsciiSpace)
            .word_splitter(WordSplitter::NoHyphenation)
            .break_words(false);
        for line in textwrap::wrap(&clean(text), options) {
            self.push(tone, &line);
        }
    }

    /// A paragraph behind a lead, wrapped; what runs on stands under the paragraph's beginning.
    pub(super) fn hanging(&mut self, indent: usize, lead: &str, text: &str) {
        let first = format!("{}{}", " ".repeat(indent), clean(lead));
        let next = " ".repeat(first.chars().count());
        self.wrapped(Tone::Plain, &first, &next, text);
    }

    /// A line as it is, not wrapped.
    pub(super) fn raw(&mut self, indent: usize, tone: Tone, text: &str) {
        self.push(tone, &format!("{}{}", " ".repeat(indent), clean(text)));
    }

    fn push(&mut self, tone: Tone, line: &str) {
        let line = line.trim_end();
        let style = tone.style();
        if self.options.colour && !style.is_plain() && !line.is_empty() {
            let text = line.trim_start();
            let indent = &line[..line.len() - text.len()];
            self.out.push_str(&format!("{indent}{style}{text}{style:#}\n"));
        } else {
            self.out.push_str(line);
            self.out.push('\n');
        }
    }

    /// How many of a list are written: all of them, or `bound`.
    pub(super) fn bound(&self, bound: usize) -> usize {
        if self.options.all { usize::MAX } else { bound }
    }

    /// "B1, B2 and 7 more".
    pub(super) fn listed<S: AsRef<str>>(&self, items: impl IntoIterator<Item = S>) -> String {
        self.listed_to(LISTED, items)
    }

    /// The same with another bound.
    pub(super) fn listed_to<S: AsRef<str>>(&self, bound: usize, items: impl IntoIterator<Item = S>) -> String {
        let items: Vec<S> = items.into_iter().collect();
        // A remainder of one is no shorter than the item itself.
        let bound = self.bound(if items.len() == bound + 1 { bound + 1 } else { bound });
        let shown = items.iter().take(bound).map(AsRef::as_ref).collect::<Vec<&str>>().join(", ");
        match items.len().saturating_sub(bound) {
            0 => shown,
            more => {
                self.cut.set(true);
                format!("{shown} and {more} more")
            }
        }
    }

    /// The line that stands for what a bounded list left out.
    pub(super) fn more(&mut self, indent: usize, left_out: usize, (one, many): (&str, &str)) {
        if left_out > 0 {
            self.cut.set(true);
            let what = if left_out == 1 { one } else { many };
            self.toned(indent, Tone::Quiet, &format!("and {left_out} more {what}"));
        }
    }
}

/// Text from a file without what would steer a terminal or break the line.
pub(super) fn clean(text: &str) -> String {
    let steers = |c: char| c.is_control() || matches!(c, '\u{202a}'..='\u{202e}' | '\u{2066}'..='\u{2069}');
    text.chars().map(|c| if steers(c) { ' ' } else { c }).collect()
}
