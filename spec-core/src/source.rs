//! The texts that are assessed, and the door through which more of them come in.

use std::sync::Arc;

use firstpole_grammar::{Document, Span};
use serde::Serialize;
use serde::ser::SerializeStruct;

/// A file of the set that is assessed.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
pub struct FileId(pub u32);

/// A range of bytes in a file.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Place {
    /// The file.
    pub file: FileId,
    /// The range.
    pub span: Span,
}

impl Serialize for Place {
    fn serialize<S: serde::Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let mut place = serializer.serialize_struct("Place", 3)?;
        place.serialize_field("file", &self.file)?;
        place.serialize_field("start", &self.span.start)?;
        place.serialize_field("end", &self.span.end)?;
        place.end()
    }
}

impl Place {
    /// A range of a file.
    pub const fn new(file: FileId, span: Span) -> Self {
        Self { file, span }
    }

    /// The place just before this one, to insert at.
    #[must_use]
    pub const fn start(self) -> Self {
        Self { file: self.file, span: Span::new(self.span.start, self.span.start) }
    }

    /// The place just after this one, to insert at.
    #[must_use]
    pub const fn end(self) -> Self {
        Self { file: self.file, span: Span::new(self.span.end, self.span.end) }
    }
}

/// A text with its name and its lines.
#[derive(Clone, Debug)]
pub struct SourceFile {
    /// The name that findings carry.
    pub name: String,
    /// The text.
    pub text: Arc<str>,
    /// The lines of the text.
    pub document: Document,
    /// Byte offsets at which lines start; the first is 0.
    starts: Vec<u32>,
}

impl SourceFile {
    fn new(name: String, text: Arc<str>) -> Self {
        let document = firstpole_grammar::read(&text);
        let starts = line_starts(&text);
        Self { name, text, document, starts }
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
    let mut starts = vec![0];
    let mut at = 0;
    while let Some(byte) = bytes.get(at) {
        at += 1;
        match byte {
            b'\n' => starts.push(at as u32),
            b'\r' if bytes.get(at) != Some(&b'\n') => starts.push(at as u32),
            _ => {}
        }
    }
    starts
}

/// Why a text that `use` names could not be had.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct LoadFault {
    /// What is wrong and what would be right, for the author.
    pub sentence: String,
}

/// Answers `use`: the one door through which texts come in.
pub trait Loader {
    /// The name (as findings shall carry it) and the text of `path`, as the file `from` uses it.
    fn load(&self, from: &str, path: &str) -> Result<(String, Arc<str>), LoadFault>;
}

/// The loader of a set that has nothing beyond what it was given.
#[derive(Clone, Copy, Debug, Default)]
pub struct NoLoader;

impl Loader for NoLoader {
    fn load(&self, _from: &str, path: &str) -> Result<(String, Arc<str>), LoadFault> {
        Err(LoadFault { sentence: format!("{path} is not among the texts that are assessed") })
    }
}

/// The texts that are assessed.
#[derive(Clone, Debug, Default)]
pub struct Sources {
    files: Vec<Arc<SourceFile>>,
}

impl Sources {
    /// No text yet.
    pub fn new() -> Self {
        Self::default()
    }

    /// One text.
    pub fn of(name: impl Into<String>, text: impl Into<Arc<str>>) -> Self {
        let mut sources = Self::new();
        sources.add(name, text);
        sources
    }

    /// Adds a text; one that is there already under this name is kept.
    pub fn add(&mut self, name: impl Into<String>, text: impl Into<Arc<str>>) -> FileId {
        let name = name.into();
        if let Some(id) = self.find(&name) {
            return id;
        }
        self.files.push(Arc::new(SourceFile::new(name, text.into())));
        FileId(self.files.len() as u32 - 1)
    }

    /// The text of a name.
    pub fn find(&self, name: &str) -> Option<FileId> {
        self.files.iter().position(|file| file.name == name).map(|at| FileId(at as u32))
    }

    /// A file of the set.
    pub fn file(&self, id: FileId) -> Option<&SourceFile> {
        self.files.get(id.0 as usize).map(Arc::as_ref)
    }

    /// The files of the set, in the order in which they came in.
    pub fn files(&self) -> impl Iterator<Item = (FileId, &SourceFile)> {
        self.files.iter().enumerate().map(|(at, file)| (FileId(at as u32), file.as_ref()))
    }

    /// The text at a place.
    pub fn text(&self, place: Place) -> &str {
        self.file(place.file).map_or("", |file| place.span.of(&file.text))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn positions_count_characters_from_one() {
        let sources = Sources::of("a", "\u{feff}ab\r\nµ°C x\rlast");
        let file = sources.file(FileId(0)).expect("a file");
        assert_eq!(file.position(3), Position { line: 1, column: 1 });
        let x = file.text.find('x').expect("x") as u32;
        assert_eq!(file.position(x), Position { line: 2, column: 5 });
        assert_eq!(file.position(file.text.len() as u32), Position { line: 3, column: 5 });
    }
}
