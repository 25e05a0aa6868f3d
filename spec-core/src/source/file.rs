//! A text with its name, its blocks and its lines.

use std::sync::Arc;

use firstpole_grammar::{LineKind, Span};
use serde::Serialize;

use super::block::{self, BlockAt, Numbers};

/// A text with its name and its lines.
#[derive(Clone, Debug)]
pub struct SourceFile {
    /// The name that findings carry.
    pub name: String,
    /// The text.
    pub text: Arc<str>,
    pub(crate) blocks: Vec<BlockAt>,
    /// Byte offsets at which lines start; the first is 0.
    starts: Vec<u32>,
}

/// A line in its text.
#[derive(Clone, Copy, Debug)]
pub struct LineAt<'a> {
    /// Byte offset of its first character in the text.
    pub start: u32,
    /// Bytes before its ending.
    pub len: u32,
    /// What it says; spans inside count from the start of the line.
    pub kind: &'a LineKind,
}

impl LineAt<'_> {
    /// A span of this line as a span of the text.
    pub const fn place(&self, span: Span) -> Span {
        span.shifted(self.start)
    }

    /// The whole line without its ending, as a span of the text.
    pub const fn span(&self) -> Span {
        Span::new(self.start, self.start + self.len)
    }
}

impl SourceFile {
    pub(super) fn new(name: String, text: Arc<str>, numbers: &mut Numbers) -> Self {
        let blocks = block::cut(&text, numbers);
        let starts = line_starts(&text);
        Self { name, text, blocks, starts }
    }

    /// The same file with another text; blocks that are the same are taken over.
    pub(super) fn again(&self, text: Arc<str>, numbers: &mut Numbers) -> Self {
        let blocks = block::cut_again(&text, &self.text, &self.blocks, numbers);
        let starts = line_starts(&text);
        Self { name: self.name.clone(), text, blocks, starts }
    }

    /// Line and column of a byte offset, both from one; columns count characters.
    pub fn position(&self, offset: u32) -> Position {
        let line = self.starts.partition_point(|start| *start <= offset).max(1);
        let start = self.starts.get(line - 1).copied().unwrap_or(0);
        let before = Span::new(start, offset).of(&self.text);
        let before = before.strip_prefix('\u{feff}').unwrap_or(before);
        Position { line: line as u32, column: before.chars().count() as u32 + 1 }
    }

    /// Where lines start, in bytes; the first is 0.
    pub fn line_starts(&self) -> &[u32] {
        &self.starts
    }

    /// The lines, in order.
    pub fn lines(&self) -> impl Iterator<Item = LineAt<'_>> {
        self.blocks.iter().flat_map(lines_of)
    }

    /// The lines that touch a range of the text.
    pub fn lines_touching(&self, span: Span) -> impl Iterator<Item = LineAt<'_>> {
        let first = self.blocks.partition_point(|at| at.end() < span.start);
        let blocks = self.blocks.get(first..).unwrap_or(&[]).iter().take_while(move |at| at.start <= span.end);
        blocks.flat_map(move |at| {
            let from = at.block.lines.partition_point(|line| at.start + line.start + line.len < span.start);
            lines_of(at).skip(from).take_while(move |line| line.start <= span.end)
        })
    }

    /// The line that a byte offset lies in or at the end of.
    pub fn line_at(&self, offset: u32) -> Option<LineAt<'_>> {
        self.lines_touching(Span::new(offset, offset)).find(|line| line.span().touches(offset))
    }

    /// The block that holds a byte offset.
    pub(crate) fn block_at(&self, offset: u32) -> Option<&BlockAt> {
        let next = self.blocks.partition_point(|at| at.start <= offset);
        self.blocks.get(next.saturating_sub(1))
    }
}

fn lines_of(at: &BlockAt) -> impl Iterator<Item = LineAt<'_>> {
    at.block.lines.iter().map(|line| LineAt { start: at.start + line.start, len: line.len, kind: &line.kind })
}

/// A place for people: line and column from one, columns in characters.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Serialize)]
pub struct Position {
    /// The line.
    pub line: u32,
    /// The column.
    pub column: u32,
}

fn line_starts(text: &str) -> Vec<u32> {
    let bytes = text.as_bytes();
    let mut starts = Vec::with_capacity(bytes.len() / 32 + 1);
    starts.push(0);
    for at in memchr::memchr2_iter(b'\n', b'\r', bytes) {
        if bytes.get(at) == Some(&b'\n') || bytes.get(at + 1) != Some(&b'\n') {
            starts.push(at as u32 + 1);
        }
    }
    starts
}
