//! Rules on making and peak withstand currents.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
