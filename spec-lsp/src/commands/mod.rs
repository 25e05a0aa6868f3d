//! One file a command.

pub mod align;
pub mod assess;
pub mod clause;
pub mod serve;
