//! One building in every form: the same graph where the version is the same, and the same review of all.

mod forms;
