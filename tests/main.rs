//! The one test harness; each module holds the tests of one room, through its public door.

mod end_to_end;
mod eurocode;
mod exchange;
mod findings;
mod intent;
mod joints;
mod report;
mod rulebook;
mod sample;
mod shop;
mod writer;
