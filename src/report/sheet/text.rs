//! A sheet as text.

use comfy_table::{CellAlignment, ContentArrangement, TableComponent};

use super::content::{Block, Sheet, Table};
use super::formula::{Line, Piece, symbol};
use super::working::WorkLine;
use crate::report::page::{Page, Tone, clean};

/// Draws one sheet.
pub(super) fn draw(page: &mut Page, sheet: &Sheet) {
    page.heading(&sheet.title);
    sheet.head.iter().for_each(|block| draw_block(page, block));
    for section in &sheet.sections {
        match section.level {
            2 => page.heading(&section.heading.to_uppercase()),
            _ => page.heading(&section.heading),
        }
        section.blocks.iter().for_each(|block| draw_block(page, block));
    }
}

/// A line in one string: F_T,1,Rd.
fn plain(line: &Line) -> String {
    let piece = |piece: &Piece| match piece {
        Piece::Text(text) => text.clone(),
        Piece::Symbol(code) => match symbol(code) {
            (letter, sub) if sub.is_empty() => letter,
            (letter, sub) => format!("{letter}_{sub}"),
        },
    };
    line.iter().map(piece).collect()
}

fn draw_block(page: &mut Page, block: &Block) {
    match block {
        Block::Line(line) => page.line(3, &plain(line)),
        Block::Outcome(word, said) => {
            let tone = match *word {
                "hold" => Tone::Hold,
                "unproven" => Tone::Unproven,
                "comment" => Tone::Comment,
                _ => Tone::Plain,
            };
            let said = if said.is_empty() { String::new() } else { format!(": {said}") };
            page.toned(3, tone, &format!("{}{said}", word.to_uppercase()));
        }
        Block::List(sentences) => sentences.iter().for_each(|sentence| page.line(3, &format!("- {sentence}"))),
        Block::Pairs(pairs) => {
            let wide = pairs.iter().map(|(name, _)| name.chars().count()).max().unwrap_or(0);
            for (name, value) in pairs {
                page.hanging(3, &format!("{name:wide$}  "), value);
            }
        }
        Block::Table(table) => {
            let width = page.options().width.saturating_sub(3);
            page.blank();
            page.toned(3, Tone::Quiet, &table.caption);
            for line in drawn(table, width) {
                page.raw(3, Tone::Plain, &line);
            }
            page.blank();
        }
        Block::Drawing => {}
        Block::Working(lines) => lines.iter().for_each(|line| work(page, line)),
        Block::Blanks(names) => {
            for name in names {
                page.blank();
                page.raw(3, Tone::Plain, &format!("{name:12}{}", "_".repeat(40)));
            }
        }
    }
}

fn drawn(table: &Table, width: usize) -> Vec<String> {
    let mut drawn = comfy_table::Table::new();
    drawn.load_preset(comfy_table::presets::NOTHING);
    drawn.set_style(TableComponent::HeaderLines, '-');
    drawn.set_style(TableComponent::MiddleHeaderIntersections, ' ');
    drawn.set_content_arrangement(ContentArrangement::Dynamic);
    drawn.set_width(u16::try_from(width).unwrap_or(u16::MAX));
    drawn.set_header(table.head.iter().map(|(name, _)| plain(name)));
    for row in &table.rows {
        drawn.add_row(row.iter().map(|cell| clean(cell)));
    }
    for (column, (_, number)) in drawn.column_iter_mut().zip(&table.head) {
        column.set_padding((0, 1));
        if *number {
            column.set_cell_alignment(CellAlignment::Right);
        }
    }
    drawn.lines().map(|line| line.trim_end().to_owned()).collect()
}

fn work(page: &mut Page, line: &WorkLine) {
    match line {
        WorkLine::Heading(heading) => page.line(3, &format!("{heading}:")),
        WorkLine::As(said) => page.line(5, &plain(said)),
        WorkLine::Given(what, values) => page.hanging(5, "given ", &format!("{what}: {}", plain(values))),
        WorkLine::Step { symbol, formula, numbers, value, clause } => {
            let (symbol, formula) = (plain(symbol), plain(formula));
            let value = match numbers {
                Some(numbers) => format!("= {} = {value}", plain(numbers)),
                None => format!("= {value}"),
            };
            let lead = format!("{symbol} ");
            page.hanging(5, &lead, &format!("= {formula}   [{clause}]"));
            page.hanging(5 + lead.chars().count(), "", &value);
        }
    }
}
