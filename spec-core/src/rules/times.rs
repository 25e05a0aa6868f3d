//! Rules on times of operation.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
