//! The rule files and what is found in them.

mod names;
mod overrides;
mod sections;
mod tables;
