//! Rules on single statements: said twice, in two units, without a basis.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
