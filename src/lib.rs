//! Lays a steel shop model on the engineer's joint schedule and says where they do not lie flush.
//!
//! Bytes in, [`review::Review`] out; DEVELOPERS.md draws the trip of the data.

pub mod assess;
pub mod compose;
pub mod eurocode;
pub mod exchange;
pub mod findings;
pub mod intent;
pub mod joints;
pub mod origin;
pub mod report;
pub mod review;
pub mod rulebook;
pub mod run;
pub mod shop;
pub mod units;
pub mod working;
