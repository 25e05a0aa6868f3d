//! Rules on breaking current, DC component, fault level.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
