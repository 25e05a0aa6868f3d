//! Rules on short-time withstand and heat.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
