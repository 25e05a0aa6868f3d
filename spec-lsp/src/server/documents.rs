//! The open documents: their texts, edited strictly in the order in which the client tells of it, and the last assessment of each.
//!
//! Everything here happens under one lock that is never held over a wait.

use std::collections::BTreeMap;
use std::path::PathBuf;
use std::sync::{Arc, Mutex, MutexGuard, PoisonError};

use firstpole_core::{Assessor, Span};
use tokio::sync::Notify;

use super::checker::Checked;
use super::findings::Takes;
use super::names::{name_of, uri_of};
use super::positions::{Encoding, Lines, Position, View};

/// An edit of a document.
#[derive(Clone, Debug)]
pub struct Change {
    /// What it replaces; the whole text where absent.
    pub range: Option<(Position, Position)>,
    /// The new text.
    pub text: String,
}

/// The open documents.
pub struct Documents {
    state: Mutex<State>,
    /// Rung whenever something has changed that an assessment rests on.
    pub changed: Notify,
    /// The rules and the policy that texts are held against.
    pub assessor: Assessor,
}

/// What the lock guards.
#[derive(Debug, Default)]
pub struct State {
    open: BTreeMap<String, Open>,
    /// Counts changes, so that each state of each text has a number of its own.
    clock: u64,
    /// Counts the times when files outside of the editor may have changed.
    disk: u64,
    /// The folders of the workspace.
    roots: Vec<PathBuf>,
    /// What columns count.
    pub encoding: Encoding,
    /// What the client takes of a finding.
    pub takes: Takes,
}

/// An open document.
#[derive(Debug)]
pub struct Open {
    /// The address that the client knows it by.
    pub uri: String,
    /// The client's number of its text.
    pub version: i32,
    /// Our number of its text.
    pub stamp: u64,
    text: String,
    lines: Lines,
    /// The text as it is handed on, made when it is first asked for.
    shared: Option<Arc<str>>,
    /// The last assessment that came to an end.
    pub checked: Option<Arc<Checked>>,
    /// Whether the client was told of it.
    pub told: bool,
    /// The stamp of the text on which the checker failed.
    pub failed: Option<u64>,
}

/// The texts of one moment.
#[derive(Clone, Debug, Default)]
pub struct Snapshot {
    /// The open documents by their names.
    pub open: BTreeMap<String, Known>,
    /// Counts up with every change of any document.
    pub moment: u64,
    /// The state of the files outside of the editor.
    pub disk: u64,
    /// The folders of the workspace.
    pub roots: Vec<PathBuf>,
    /// What columns count.
    pub encoding: Encoding,
    /// What the client takes of a finding.
    pub takes: Takes,
}

/// A document of a snapshot.
#[derive(Clone, Debug)]
pub struct Known {
    /// The address that the client knows it by.
    pub uri: String,
    /// Our number of its text.
    pub stamp: u64,
    /// The text.
    pub text: Arc<str>,
}

impl Snapshot {
    /// The address of a file: the client's own where it is open.
    pub fn uri(&self, name: &str) -> String {
        self.open.get(name).map_or_else(|| uri_of(name), |known| known.uri.clone())
    }
}

impl State {
    /// A document.
    pub fn document(&self, name: &str) -> Option<&Open> {
        self.open.get(name)
    }

    /// A document, to be changed.
    pub fn document_mut(&mut self, name: &str) -> Option<&mut Open> {
        self.open.get_mut(name)
    }

    /// Our number of a document's text, where it is open.
    pub fn stamp(&self, name: &str) -> Option<u64> {
        self.open.get(name).map(|open| open.stamp)
    }

    /// The texts of this moment.
    pub fn snapshot(&mut self) -> Snapshot {
        let open = self
            .open
            .iter_mut()
            .map(|(name, open)| {
                let text = open.shared.get_or_insert_with(|| Arc::from(open.text.as_str())).clone();
                let known = Known { uri: open.uri.clone(), stamp: open.stamp, text };
                (name.clone(), known)
            })
            .collect();
        let roots = self.roots.clone();
        Snapshot { open, moment: self.clock, disk: self.disk, roots, encoding: self.encoding, takes: self.takes }
    }

    /// Whether an assessment still says what the texts say.
    pub fn is_fresh(&self, checked: &Checked) -> bool {
        checked
            .read
            .iter()
            .all(|read| self.stamp(&read.name) == read.stamp && (read.stamp.is_some() || self.disk == checked.disk))
    }

    /// The document that is to be assessed next. Those that were changed themselves come before those that use a changed one,
    /// and among these the one that has waited longest.
    pub fn due(&self) -> Option<String> {
        self.open
            .iter()
            .filter(|(_, open)| open.failed != Some(open.stamp))
            .filter_map(|(name, open)| match &open.checked {
                Some(checked) if self.is_fresh(checked) => None,
                Some(checked) => Some((checked.own_stamp() == Some(open.stamp), open.stamp, name)),
                None => Some((false, open.stamp, name)),
            })
            .min()
            .map(|(_, _, name)| name.clone())
    }

    /// The assessments that the client was not told of; from now on it was.
    pub fn untold(&mut self) -> Vec<Arc<Checked>> {
        self.open
            .values_mut()
            .filter_map(|open| if std::mem::replace(&mut open.told, true) { None } else { open.checked.clone() })
            .collect()
    }

    fn tick(&mut self) -> u64 {
        self.clock += 1;
        self.clock
    }
}

impl Documents {
    /// None open yet.
    pub fn new(assessor: Assessor) -> Self {
        Self { state: Mutex::default(), changed: Notify::new(), assessor }
    }

    /// The state, locked. A panic elsewhere does not take the documents along: every change of them is made in one piece.
    pub fn lock(&self) -> MutexGuard<'_, State> {
        self.state.lock().unwrap_or_else(PoisonError::into_inner)
    }

    /// Takes what the client told at the start.
    pub fn begin(&self, roots: Vec<PathBuf>, encoding: Encoding, takes: Takes) {
        let mut state = self.lock();
        state.roots = roots;
        state.encoding = encoding;
        state.takes = takes;
    }

    /// Takes a document in.
    pub fn open(&self, uri: &str, version: i32, text: String) {
        let mut state = self.lock();
        let stamp = state.tick();
        let lines = Lines::of(&text);
        let uri_text = uri.to_owned();
        let open =
            Open { uri: uri_text, version, stamp, text, lines, shared: None, checked: None, told: true, failed: None };
        state.open.insert(name_of(uri), open);
        drop(state);
        self.changed.notify_one();
    }

    /// Applies edits in their order; tells what is wrong where they are refused.
    pub fn change(&self, uri: &str, version: i32, changes: Vec<Change>) -> Result<(), String> {
        let mut state = self.lock();
        let (encoding, stamp) = (state.encoding, state.tick());
        let Some(open) = state.open.get_mut(&name_of(uri)) else {
            return Err("a change of a document that is not open was refused".to_owned());
        };
        if version <= open.version {
            return Err(format!("a change to version {version} was refused; the text is at {} already", open.version));
        }
        for change in changes {
            open.apply(change, encoding);
        }
        open.version = version;
        open.stamp = stamp;
        open.shared = None;
        drop(state);
        self.changed.notify_one();
        Ok(())
    }

    /// Lets a document go.
    pub fn close(&self, uri: &str) {
        let mut state = self.lock();
        state.open.remove(&name_of(uri));
        state.tick();
        // From now on its text is the one of the file.
        state.disk += 1;
        drop(state);
        self.changed.notify_one();
    }

    /// Files outside of the editor may have changed.
    pub fn disk_changed(&self) {
        let mut state = self.lock();
        state.tick();
        state.disk += 1;
        drop(state);
        self.changed.notify_one();
    }
}

impl Open {
    /// The text with its lines.
    pub fn view(&self) -> View<'_> {
        View { text: &self.text, starts: self.lines.starts() }
    }

    fn apply(&mut self, change: Change, encoding: Encoding) {
        let Some((start, end)) = change.range else {
            self.lines = Lines::of(&change.text);
            self.text = change.text;
            return;
        };
        let view = self.view();
        let start = view.offset(start, encoding);
        let end = view.offset(end, encoding).max(start);
        // Offsets of a view stand on borders of characters.
        self.text.replace_range(start as usize..end as usize, &change.text);
        self.lines.follow(&self.text, Span::new(start, end), change.text.len());
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const URI: &str = "file:///a/bay.cbspec";

    fn documents(text: &str) -> Documents {
        let documents = Documents::new(Assessor::standard());
        documents.open(URI, 1, text.to_owned());
        documents
    }

    fn replace(from: (u32, u32), to: (u32, u32), text: &str) -> Change {
        Change { range: Some((Position::new(from.0, from.1), Position::new(to.0, to.1))), text: text.to_owned() }
    }

    fn text(documents: &Documents) -> String {
        documents.lock().document("/a/bay.cbspec").expect("open").view().text.to_owned()
    }

    #[test]
    fn edits_are_applied_one_after_the_other() {
        let documents = documents("one\ntwo 😀 x\n");
        let changes =
            vec![replace((0, 3), (1, 0), " "), replace((0, 10), (0, 10), "!"), replace((9, 9), (9, 9), "end")];
        documents.change(URI, 2, changes).expect("newer");
        assert_eq!(text(&documents), "one two 😀! x\nend");
        documents.change(URI, 3, vec![Change { range: None, text: "whole".to_owned() }]).expect("newer");
        assert_eq!(text(&documents), "whole");
    }

    #[test]
    fn a_version_that_is_not_newer_is_refused() {
        let documents = documents("a");
        documents.change(URI, 5, vec![replace((0, 0), (0, 0), "b")]).expect("newer");
        for version in [5, 4] {
            documents.change(URI, version, vec![replace((0, 0), (0, 0), "c")]).expect_err("not newer");
        }
        assert_eq!(text(&documents), "ba");
        documents.change("file:///a/other.cbspec", 1, Vec::new()).expect_err("not open");
    }

    #[test]
    fn a_range_that_ends_before_it_starts_inserts() {
        let documents = documents("abc");
        documents.change(URI, 2, vec![replace((0, 2), (0, 1), "x")]).expect("newer");
        assert_eq!(text(&documents), "abxc");
    }

    #[test]
    fn all_spellings_of_an_address_are_one_document() {
        let documents = documents("a");
        documents.change("file:///a/bay%2Ecbspec", 2, vec![replace((0, 0), (0, 0), "b")]).expect("the same");
        documents.close("file://localhost/a/bay.cbspec");
        assert!(documents.lock().document("/a/bay.cbspec").is_none());
    }

    #[test]
    fn what_was_changed_itself_is_due_first() {
        let documents = documents("a");
        documents.open("file:///a/b.cbspec", 1, String::new());
        assert_eq!(documents.lock().due().as_deref(), Some("/a/bay.cbspec"));
    }
}
