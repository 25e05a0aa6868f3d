//! Rules on transient recovery voltage.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
