//! Rules on gas and climate.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
