//! One file a command.

pub mod assess;
pub mod clause;
pub mod serve;
