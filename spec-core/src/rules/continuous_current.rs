//! Rules on the continuous current.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
