//! Rules on voltage, frequency and insulation levels.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
