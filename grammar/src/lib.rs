//! The cbspec language: lines with byte spans, and the forms of values.
//!
//! This crate knows how a specification is written and nothing of what it is about. [`read`] splits a text into lines and
//! reads each by itself, so that a broken line spoils only itself; the functions of [`value`] read the text of a value in the
//! form that its label asks for. Everything comes back as data: a line that cannot be read is a [`LineKind::Broken`], with
//! what a lenient second look could still make of it.

mod fault;
mod line;
mod span;
pub mod value;

pub use fault::{Fault, Look};
pub use line::{
    Document, Heading, Line, LineKind, Link, Name, Particular, ValueForm, ValueText, read, read_line, read_lines,
};
pub use span::Span;

/// The longest line that is read, in characters; a longer one is a finding.
pub const LONGEST_LINE: usize = 4096;

pub(crate) mod parser {
    use std::num::NonZeroUsize;
    use std::sync::Once;

    #[derive(pest_derive::Parser)]
    #[grammar = "../cbspec.pest"]
    pub struct CbspecParser;

    /// Rule calls that pest may make for one text. The longest line needs about 20 a character; more than this is a fault of
    /// the grammar, and must end in an error and not in a standstill.
    const CALLS: usize = super::LONGEST_LINE * 64;

    pub fn parse(rule: Rule, text: &str) -> Result<pest::iterators::Pairs<'_, Rule>, pest::error::Error<Rule>> {
        static LIMIT: Once = Once::new();
        LIMIT.call_once(|| pest::set_call_limit(NonZeroUsize::new(CALLS)));
        <CbspecParser as pest::Parser<Rule>>::parse(rule, text)
    }
}
