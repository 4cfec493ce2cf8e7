//! Output formats: the only room that knows them.
