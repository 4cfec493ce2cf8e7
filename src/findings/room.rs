//! What stands beside the bolts on the two faces that heads and nuts bear on, and how near.

use super::Context;
use crate::joints::{BoltRow, EndPlateLayout, PlateSide};
use crate::origin::Known;
use crate::rulebook::Section;
use crate::units::{Length, mm};

/// Something beside the bolts, nearest to one of them.
pub(super) struct Beside<'a> {
    /// In words.
    pub what: Named,
    /// Height of the row whose bolts are nearest to it.
    pub row: Length,
    /// From the bolt's axis to it.
    pub distance: Length,
    /// GlobalIds of the parts that it is about.
    pub on: Vec<&'a str>,
}

/// A part, and the words that tell whether its weld is in.
pub(super) type Named = (&'static str, &'static str);

/// A rectangle in (across, height), symmetrical about the web.
struct Block {
    outer: Length,
    low: Length,
    high: Length,
}

impl Block {
    /// From the axis of one bolt of a row; 0 inside.
    fn distance(&self, row: &BoltRow) -> Length {
        let (x, y) = (0.5 * row.gauge, row.height);
        let beyond = |value: Length, low: Length, high: Length| (low - value).max(value - high).max(Length::ZERO).get();
        mm(beyond(x, Length::ZERO, self.outer).hypot(beyond(y, self.low, self.high)))
    }
}

/// Flanges, webs, stiffeners with their welds and radii, each with the bolt nearest to it. What nobody knows (a throat, a
/// radius) is left out: the steel itself is there in any case.
pub(super) fn beside<'a>(context: &Context<'a>) -> Vec<Beside<'a>> {
    let Some(layout) = context.layout else { return Vec::new() };
    let mut blocks: Vec<(Named, Block, Vec<&str>)> = Vec::new();
    for side in layout.sides() {
        let on = side.plate.guid.as_str();
        blocks.extend(on_plate(side).into_iter().flatten().map(|(what, block)| (what, block, vec![on])));
    }
    let column = layout.supporting().guid.as_str();
    if let Some(layout) = layout.on_column() {
        blocks.extend(column_web(layout).map(|(what, block)| (what, block, vec![column])));
        blocks.extend(stiffeners(layout));
    }
    let nearest = |(what, block, on): (Named, Block, Vec<&'a str>)| {
        let rows = layout.bolts().rows.iter().map(|row| (row.height, block.distance(row)));
        let (row, distance) = rows.min_by(|a, b| a.1.get().total_cmp(&b.1.get()))?;
        Some(Beside { what, row, distance, on })
    };
    blocks.into_iter().filter_map(nearest).collect()
}

/// The leg of a fillet (a butt weld has none), with the words that tell whether it is in.
fn leg(throat: &Known<Length>, butt: bool) -> (Length, &'static str) {
    match throat {
        Ok(throat) if !butt && throat.value > Length::ZERO => (2.0_f64.sqrt() * throat.value, " or its weld"),
        _ => (Length::ZERO, ""),
    }
}

/// A beam's end on its end plate.
fn on_plate(side: PlateSide<'_>) -> Option<[(Named, Block); 3]> {
    let beam = side.beam.section.as_ref().ok()?;
    let Section { h, b, t_w, t_f, .. } = beam.value;
    let (low, high, full) = (side.soffit, side.soffit + h, side.welds.full);
    let flange = |name, throat, butt, low: Length, high: Length| {
        let (leg, weld) = leg(throat, butt);
        ((name, weld), Block { outer: 0.5 * b, low: low - leg, high: high + leg })
    };
    let (web_leg, web_weld) = leg(&side.welds.web, full.web);
    Some([
        flange("the beam's top flange", &side.welds.flange_top, full.flange_top, high - t_f, high),
        flange("the beam's bottom flange", &side.welds.flange_bottom, full.flange_bottom, low, low + t_f),
        (("the beam's web", web_weld), Block { outer: 0.5 * t_w + web_leg, low, high }),
    ])
}

/// The column's web with its root radius: as high as the column is.
fn column_web(layout: &EndPlateLayout) -> Option<(Named, Block)> {
    let column = &layout.column.section.as_ref().ok()?.value;
    let r = column.r.unwrap_or(Length::ZERO);
    let what = if r > Length::ZERO { "the root radius of the column" } else { "the column's web" };
    let far = mm(f64::INFINITY);
    Some(((what, ""), Block { outer: 0.5 * column.t_w + r, low: -far, high: far }))
}

fn stiffeners(layout: &EndPlateLayout) -> Vec<(Named, Block, Vec<&str>)> {
    let Ok(column) = &layout.column.section else { return Vec::new() };
    let mut all = Vec::new();
    for stiffener in &layout.stiffeners {
        let (leg, weld) = leg(&stiffener.weld, false);
        let half = 0.5 * stiffener.thickness + leg;
        let block = Block {
            outer: 0.5 * column.value.t_w + stiffener.outstand,
            low: stiffener.height - half,
            high: stiffener.height + half,
        };
        let guids = stiffener.guids.iter().map(String::as_str).collect();
        all.push((("a stiffener of the column", weld), block, guids));
    }
    all
}
