//! A sheet as one HTML page that needs nothing else: no script, no network, no font of its own.

use std::fmt::Write;

use maud::{DOCTYPE, Markup, PreEscaped, html};

use super::content::{Block, Sheet, Table};
use super::formula::{Line, Piece, symbol};
use super::working::WorkLine;
use crate::report::drawing;
use crate::report::page::clean;
use crate::review::{CAUTION, JointReview, Review};

/// The page of these sheets, one article a joint.
pub(super) fn page(review: &Review, sheets: &[(&JointReview, Sheet)]) -> String {
    let titles: Vec<&str> = sheets.iter().map(|(_, sheet)| sheet.title.as_str()).collect();
    let footers: String = (sheets.iter().enumerate()).map(|(i, (joint, _))| footer(i, review, joint)).collect();
    html! {
        (DOCTYPE)
        html lang="en" {
            head {
                meta charset="utf-8";
                meta name="viewport" content="width=device-width, initial-scale=1";
                title { (clean(&titles.join("; "))) }
                style { (PreEscaped(include_str!("style.css"))) (PreEscaped(drawing::STYLE)) (PreEscaped(footers)) }
            }
            body {
                main {
                    @for (i, (joint, sheet)) in sheets.iter().enumerate() {
                        (PreEscaped("\n"))
                        (article(&format!("sheet-{}", i + 1), joint, sheet))
                    }
                }
            }
        }
        (PreEscaped("\n"))
    }
    .into_string()
}

/// The foot of every printed page of a joint: its mark, the caution, the model's hash, the tool, the page.
fn footer(i: usize, review: &Review, joint: &JointReview) -> String {
    let hash: String = review.sha256.chars().take(16).collect();
    let lines = [
        format!(
            "Joint {}, model {} (SHA-256 {hash}…), {} {}",
            clean(&joint.mark),
            clean(&review.file),
            env!("CARGO_PKG_NAME"),
            env!("CARGO_PKG_VERSION")
        ),
        CAUTION.to_owned(),
    ];
    let lines = lines.map(|line| css(&line)).join("\\a ");
    format!(
        "#sheet-{n}{{page:joint-{n}}}\n@page joint-{n}{{\
         @bottom-left{{content:\"{lines}\";white-space:pre-line;font:7pt 'DejaVu Sans',Verdana,Arial,sans-serif;width:88%}}\
         @bottom-right{{content:counter(page) \" / \" counter(pages);font:7pt 'DejaVu Sans',Verdana,Arial,sans-serif}}}}\n",
        n = i + 1,
    )
}

/// A text inside a string of CSS inside an element of HTML: whatever is not plain is written by its number.
fn css(text: &str) -> String {
    let mut out = String::new();
    for c in text.chars() {
        if c.is_ascii_alphanumeric() || matches!(c, ' ' | ',' | '.' | ':' | '-' | '(' | ')') {
            out.push(c);
        } else {
            // Writing to a String can't fail.
            let _ = write!(out, "\\{:06x}", u32::from(c));
        }
    }
    out
}

fn article(id: &str, joint: &JointReview, sheet: &Sheet) -> Markup {
    html! {
        article id=(id) {
            h1 { (clean(&sheet.title)) }
            @for block in &sheet.head { (draw(id, joint, block)) }
            @for section in &sheet.sections {
                (PreEscaped("\n"))
                @match section.level {
                    2 => h2 { (clean(&section.heading)) },
                    _ => h3 { (clean(&section.heading)) },
                }
                @for block in &section.blocks { (draw(id, joint, block)) }
            }
        }
    }
}

/// A line with its symbols set: F with T,1,Rd below.
fn set(line: &Line) -> Markup {
    html! {
        @for piece in line {
            @match piece {
                Piece::Text(text) => (clean(text)),
                Piece::Symbol(code) => {
                    @let (letter, sub) = symbol(code);
                    var { (letter) }
                    @if !sub.is_empty() { sub { (sub) } }
                },
            }
        }
    }
}

fn draw(id: &str, joint: &JointReview, block: &Block) -> Markup {
    html! {
        @match block {
            Block::Line(line) => p { (set(line)) },
            Block::Outcome(word, said) => {
                p class="outcome" { strong { (word) } @if !said.is_empty() { ": " (clean(said)) } }
            },
            Block::List(sentences) => ul { @for sentence in sentences { li { (clean(sentence)) } } },
            Block::Pairs(pairs) => table class="pairs" {
                tbody { @for (name, value) in pairs { tr { th scope="row" { (name) } td { (clean(value)) } } } }
            },
            Block::Table(table) => (draw_table(table)),
            Block::Drawing => @if let Some(drawing) = drawing::sketch(joint, &format!("{id}-sketch")) {
                figure {
                    (drawing)
                    figcaption {
                        "Both views at one scale; lengths in mm, heights from the soffit of the beam's lower flange. \
                         Arrows: row forces at the full moment resistance and their sum in compression. \
                         Broken thick outline: what governs. a: throats of the fillets."
                    }
                }
            } @else { p { "The joint's geometry can't be drawn." } },
            Block::Working(lines) => (working(lines)),
            Block::Blanks(names) => table class="blanks" {
                tbody { @for name in names { tr { th scope="row" { (name) } td {} } } }
            },
        }
    }
}

fn draw_table(table: &Table) -> Markup {
    let class = |number: bool| number.then_some("number");
    html! {
        table {
            caption { (clean(&table.caption)) }
            thead { tr { @for (name, number) in &table.head { th scope="col" class=[class(*number)] { (set(name)) } } } }
            tbody {
                @for row in &table.rows {
                    tr {
                        @for (cell, (_, number)) in row.iter().zip(&table.head) {
                            td class=[class(*number)] { (clean(cell)) }
                        }
                    }
                }
            }
        }
    }
}

fn working(lines: &[WorkLine]) -> Markup {
    html! {
        table class="working" {
            thead { tr {
                th scope="col" { "symbol" } th scope="col" { "formula and numbers" }
                th scope="col" class="number" { "value" } th scope="col" { "clause or origin" }
            } }
            tbody {
                @for line in lines {
                    tr {
                        @match line {
                            WorkLine::Heading(heading) => th class="about" scope="colgroup" colspan="4" { (clean(heading)) },
                            WorkLine::As(said) => td colspan="4" { (set(said)) },
                            WorkLine::Given(what, values) => {
                                td class="symbol" { "given" }
                                td colspan="2" { (set(values)) }
                                td class="clause" { (what) }
                            },
                            WorkLine::Step { symbol, formula, numbers, value, clause } => {
                                td class="symbol" { (set(symbol)) }
                                td {
                                    "= " (set(formula))
                                    @if let Some(numbers) = numbers { span class="numbers" { "= " (set(numbers)) } }
                                }
                                td class="value" { "= " (value) }
                                td class="clause" { (clause) }
                            },
                        }
                    }
                }
            }
        }
    }
}
