//! Joints found in hand-built steel. Expected values are the parameters with which the steel was built.

mod bases;
mod build;
mod flexible;
mod haunches;
mod kinds;
mod laws;
mod layouts;
mod marks;
mod refusals;
mod splices;
mod strengthening;
