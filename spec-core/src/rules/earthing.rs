//! Rules on the earthing of the neutral: first-pole-to-clear and out-of-phase factors.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
