//! The texts that are assessed, and the door through which more of them come in.

mod block;
mod file;

use std::sync::Arc;

use firstpole_grammar::Span;
use serde::Serialize;

pub(crate) use block::BlockAt;
pub use block::{Block, BlockId};
pub use file::{LineAt, Position, SourceFile};

use block::Numbers;

/// A file of the set that is assessed.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
pub struct FileId(pub u32);

/// A range of bytes of a text, kept by the block that it lies in: an edit elsewhere leaves it right. [`Sources::at`] tells where in
/// which file that is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct Place {
    /// The block.
    block: BlockId,
    /// The range, counted from the start of the block.
    within: Span,
}

impl Place {
    /// A range of a block, counted from its start.
    pub(crate) const fn new(block: BlockId, within: Span) -> Self {
        Self { block, within }
    }

    /// The block that it lies in.
    pub const fn block(self) -> BlockId {
        self.block
    }

    /// The range, counted from the start of the block.
    pub const fn within(self) -> Span {
        self.within
    }

    /// The place just before this one, to insert at.
    #[must_use]
    pub const fn start(self) -> Self {
        Self { block: self.block, within: Span::new(self.within.start, self.within.start) }
    }

    /// The place just after this one, to insert at.
    #[must_use]
    pub const fn end(self) -> Self {
        Self { block: self.block, within: Span::new(self.within.end, self.within.end) }
    }

    /// From the start of this one to the end of another of the same block.
    #[must_use]
    pub const fn to(self, other: Self) -> Self {
        Self { block: self.block, within: Span::new(self.within.start, other.within.end) }
    }

    /// Whether nothing stands there.
    pub const fn is_empty(self) -> bool {
        self.within.is_empty()
    }
}

/// Where a place lies: the file, and the bytes of its text.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct FilePlace {
    /// The file.
    pub file: FileId,
    /// The range of its text.
    pub span: Span,
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
    numbers: Numbers,
    /// Files of an assessment before, from which blocks are taken over.
    before: Vec<Option<Arc<SourceFile>>>,
    /// The file and the start of each block, by its number.
    starts: Vec<(FileId, u32)>,
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

    /// No text yet, but a memory of those of `before`: of a text that comes in under its name, what has not changed is taken over.
    pub(crate) fn after(before: &Self) -> Self {
        Self {
            files: Vec::with_capacity(before.files.len()),
            numbers: before.numbers.clone(),
            before: before.files.iter().cloned().map(Some).collect(),
            starts: before.starts.clone(),
        }
    }

    /// Adds a text; one that is there already under this name is kept.
    pub fn add(&mut self, name: impl Into<String>, text: impl Into<Arc<str>>) -> FileId {
        let (name, text) = (name.into(), text.into());
        if let Some(id) = self.find(&name) {
            return id;
        }
        let id = FileId(self.files.len() as u32);
        let same_name = |file: &&mut Option<Arc<SourceFile>>| file.as_ref().is_some_and(|file| file.name == name);
        let file = match self.before.iter_mut().find(same_name).and_then(Option::take) {
            Some(old) if old.text == text => old,
            Some(old) => Arc::new(old.again(text, &mut self.numbers)),
            None => Arc::new(SourceFile::new(name, text, &mut self.numbers)),
        };
        self.starts.resize(self.numbers.count(), (id, 0));
        for at in &file.blocks {
            if let Some(slot) = self.starts.get_mut(at.id.0 as usize) {
                *slot = (id, at.start);
            }
        }
        self.files.push(file);
        id
    }

    /// Forgets what was before: the numbers of blocks whose files did not come in again are free.
    pub(crate) fn settle(&mut self) {
        for file in std::mem::take(&mut self.before).into_iter().flatten() {
            self.numbers.give_back(&file.blocks);
        }
    }

    /// The text of a name.
    pub fn find(&self, name: &str) -> Option<FileId> {
        self.files.iter().position(|file| file.name == name).map(|at| FileId(at as u32))
    }

    /// A file of the set.
    pub fn file(&self, id: FileId) -> Option<&SourceFile> {
        self.files.get(id.0 as usize).map(Arc::as_ref)
    }

    /// A file of the set, to be kept.
    pub(crate) fn shared(&self, id: FileId) -> Option<Arc<SourceFile>> {
        self.files.get(id.0 as usize).cloned()
    }

    /// The files of the set, in the order in which they came in.
    pub fn files(&self) -> impl Iterator<Item = (FileId, &SourceFile)> {
        self.files.iter().enumerate().map(|(at, file)| (FileId(at as u32), file.as_ref()))
    }

    /// Where a place lies.
    pub fn at(&self, place: Place) -> FilePlace {
        let (file, start) = self.starts.get(place.block.0 as usize).copied().unwrap_or((FileId(0), 0));
        FilePlace { file, span: place.within.shifted(start) }
    }

    /// The bytes that a place takes in the text of its file.
    pub fn span(&self, place: Place) -> Span {
        self.at(place).span
    }

    /// The file that a place lies in.
    pub fn file_of(&self, place: Place) -> Option<&SourceFile> {
        self.file(self.at(place).file)
    }

    /// The place of a range of a file's text: of the block in which it starts.
    pub fn place(&self, file: FileId, span: Span) -> Option<Place> {
        let at = self.file(file)?.block_at(span.start)?;
        Some(Place::new(at.id, Span::new(span.start - at.start, span.end - at.start)))
    }

    /// The text at a place.
    pub fn text(&self, place: Place) -> &str {
        let at = self.at(place);
        self.file(at.file).map_or("", |file| at.span.of(&file.text))
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

    #[test]
    fn lines_are_found_by_where_they_stand() {
        let sources = Sources::of("a", "cbspec 1\nsite A\n altitude: 3 m\nsite B\n altitude: 4 m");
        let file = sources.file(FileId(0)).expect("a file");
        assert_eq!(file.lines().map(|line| line.start).collect::<Vec<_>>(), [0, 9, 16, 31, 38]);
        for offset in 0..=file.text.len() as u32 {
            let line = file.line_at(offset).expect("a line");
            assert!(line.span().touches(offset), "{offset}");
        }
        assert_eq!(file.lines_touching(Span::new(20, 40)).map(|line| line.start).collect::<Vec<_>>(), [16, 31, 38]);
        let place = sources.place(FileId(0), Span::new(39, 47)).expect("a place");
        assert_eq!(sources.text(place), "altitude");
        assert_eq!(sources.at(place), FilePlace { file: FileId(0), span: Span::new(39, 47) });
    }
}
