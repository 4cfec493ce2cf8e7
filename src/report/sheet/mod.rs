//! The calculation sheet of a joint: everything that its result stands on, to be followed by hand and signed.
//!
//! What stands on it is put together once ([`content`]) and drawn twice. Whatever checks a joint has are printed, none by
//! name; formulas and numbers are those of the workings, so a sheet can't say anything else than what was computed.

mod code;
mod content;
mod formula;
mod geometry;
mod html;
mod parts;
mod text;
mod working;

use super::Options;
use super::page::Page;
use crate::review::{JointReview, Review};

/// The sheets of these joints as text, one below the other.
pub fn text(review: &Review, joints: &[&JointReview], options: &Options) -> String {
    let mut page = Page::new(options);
    joints.iter().for_each(|joint| text::draw(&mut page, &content::sheet(review, joint)));
    page.end()
}

/// The sheets of these joints as one HTML page, to be read on a screen or printed on A4.
pub fn html(review: &Review, joints: &[&JointReview]) -> String {
    let sheets: Vec<_> = joints.iter().map(|joint| (*joint, content::sheet(review, joint))).collect();
    html::page(review, &sheets)
}
