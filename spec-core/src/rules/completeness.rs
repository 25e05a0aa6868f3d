//! Rules on what a bidder or a check needs.

use super::Rule;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[];
