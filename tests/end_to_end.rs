//! The whole trip, as a user and as a hostile file see it.

mod bad_input;
mod bench;
mod deletions;
mod mutations;
mod never_clear;
mod same_building;
mod sample;
mod texts;
