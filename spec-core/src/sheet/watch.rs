//! Which sheets somebody looks at, so that what he made of them can be kept while they stay the same.
//!
//! The questions of a [`Set`](super::Set) note here what they were asked, as long as somebody on this thread watches.

use std::cell::RefCell;

use super::SheetId;
use crate::particular::SheetKind;
use crate::source::FileId;

/// A question of which sheets there are.
#[derive(Clone, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub(crate) enum Question {
    /// All of them.
    All,
    /// Those of a kind.
    OfKind(SheetKind),
    /// Those of a kind that a file can refer to.
    InReach(FileId, SheetKind),
    /// Those whose link of this word points at a sheet.
    Pointing(SheetId, &'static str),
}

/// What somebody looked at.
#[derive(Debug, Default)]
pub(crate) struct Seen {
    /// The sheets, each once.
    pub sheets: Box<[SheetId]>,
    /// The questions, each once.
    pub questions: Box<[Question]>,
}

#[derive(Debug, Default)]
struct Notes {
    sheets: Vec<SheetId>,
    questions: Vec<Question>,
}

thread_local! {
    static NOTES: RefCell<Option<Notes>> = const { RefCell::new(None) };
}

/// Does `work`, and tells what it looked at.
pub(crate) fn watch<T>(work: impl FnOnce() -> T) -> (T, Seen) {
    NOTES.set(Some(Notes::default()));
    let made = work();
    let mut notes = NOTES.take().unwrap_or_default();
    notes.sheets.sort_unstable();
    notes.sheets.dedup();
    notes.questions.sort_unstable();
    notes.questions.dedup();
    (made, Seen { sheets: notes.sheets.into(), questions: notes.questions.into() })
}

pub(super) fn sheet(id: SheetId) {
    NOTES.with_borrow_mut(|notes| {
        if let Some(notes) = notes
            && notes.sheets.last() != Some(&id)
        {
            notes.sheets.push(id);
        }
    });
}

pub(super) fn question(question: Question) {
    NOTES.with_borrow_mut(|notes| {
        if let Some(notes) = notes
            && notes.questions.last() != Some(&question)
        {
            notes.questions.push(question);
        }
    });
}
