//! What an editor can ask, one file a feature: pure functions of (assessment, file, byte offset), without protocol.

pub mod actions;
pub mod completion;
pub mod definition;
pub mod diagnostics;
pub mod folding;
pub mod hints;
pub mod hover;
pub mod lens;
pub mod links;
pub mod rename;
pub mod selection;
pub mod spot;
pub mod symbols;
#[cfg(test)]
mod testing;
pub mod text;
pub mod tokens;
