//! Rules on operating sequence and reclosing.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
