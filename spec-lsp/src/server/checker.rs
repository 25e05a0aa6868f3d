//! Assessing: one document of a snapshot, with what it uses.

use std::panic::{AssertUnwindSafe, catch_unwind};
use std::path::PathBuf;
use std::sync::{Arc, Mutex, PoisonError};

use firstpole_core::rules::Policy;
use firstpole_core::{Assessment, Assessor, FileId, LoadFault, Loader, Sources};

use super::documents::{Documents, Snapshot};
use crate::files::{self, FolderLoader, shown};

/// An assessment of one document, with what it rests on.
#[derive(Debug)]
pub struct Checked {
    /// The name of the document.
    pub name: String,
    /// What came out; the document is its first file.
    pub assessment: Assessment,
    /// Every file that was read or sought, the document itself first.
    pub read: Vec<Read>,
    /// The state of the files outside of the editor.
    pub disk: u64,
    /// The texts that it was made from.
    pub snapshot: Snapshot,
}

/// A file that an assessment rests on.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Read {
    /// Its name.
    pub name: String,
    /// The number of its text; absent where it was not open.
    pub stamp: Option<u64>,
}

/// The document itself in its assessment.
pub const OWN: FileId = FileId(0);

impl Checked {
    /// The number of the document's own text.
    pub fn own_stamp(&self) -> Option<u64> {
        self.read.first().and_then(|read| read.stamp)
    }
}

/// Looks for what `use` names among the open documents first, then below the folders of the workspace.
struct OpenFirst {
    snapshot: Snapshot,
    folder: FolderLoader,
    sought: Mutex<Vec<Read>>,
}

/// The loader belongs to the assessor, which drops it; what was sought is wanted afterwards.
struct Shared(Arc<OpenFirst>);

impl Loader for Shared {
    fn load(&self, from: &str, path: &str) -> Result<(String, Arc<str>), LoadFault> {
        let name = shown(&files::target(from, path)?);
        let known = self.0.snapshot.open.get(&name);
        let read = Read { name: name.clone(), stamp: known.map(|known| known.stamp) };
        let mut sought = self.0.sought.lock().unwrap_or_else(PoisonError::into_inner);
        if !sought.contains(&read) {
            sought.push(read);
        }
        drop(sought);
        known.map_or_else(|| self.0.folder.load(from, path), |known| Ok((name, known.text.clone())))
    }
}

/// Assesses the document `name` of a snapshot. A panic comes back as an error with what it said; absent where the document is not
/// in the snapshot.
///
/// What still holds of the assessment `before` is taken over.
pub fn assess(
    assessor: &Assessor,
    policy: Policy,
    snapshot: Snapshot,
    name: &str,
    before: Option<&Checked>,
) -> Option<Result<Checked, String>> {
    let own = snapshot.open.get(name)?.clone();
    let roots = if snapshot.roots.is_empty() {
        // Without a workspace a document may use what lies beside it and below.
        PathBuf::from(name).parent().map(ToOwned::to_owned).into_iter().collect()
    } else {
        snapshot.roots.clone()
    };
    let loader = Arc::new(OpenFirst { snapshot, folder: FolderLoader::below(roots), sought: Mutex::default() });
    let assessor = assessor.clone().with_policy(policy).with_loader(Shared(loader.clone()));
    let outcome = catch_unwind(AssertUnwindSafe(|| match before {
        Some(before) => assessor.assess_again(&before.assessment, [(name.to_owned(), own.text.clone())]),
        None => assessor.assess(&Sources::of(name, own.text.clone())),
    }));
    let assessment = match outcome {
        Ok(assessment) => assessment,
        Err(panic) => {
            let said = panic.downcast_ref::<String>().map(String::as_str);
            let said = said.or_else(|| panic.downcast_ref::<&str>().copied()).unwrap_or("no reason was given");
            return Some(Err(said.to_owned()));
        }
    };
    let mut read = vec![Read { name: name.to_owned(), stamp: Some(own.stamp) }];
    read.extend(loader.sought.lock().unwrap_or_else(PoisonError::into_inner).iter().cloned());
    let snapshot = loader.snapshot.clone();
    Some(Ok(Checked { name: name.to_owned(), assessment, read, disk: snapshot.disk, snapshot }))
}

/// What came of assessing a document.
#[derive(Debug)]
pub struct Outcome {
    /// The document.
    pub name: String,
    /// Its assessment, or what the panic said with the number of the text on which it came.
    pub result: Result<Arc<Checked>, (String, u64)>,
}

/// A document at the moment of a question.
pub enum Now {
    /// It is assessed.
    Checked(Arc<Checked>),
    /// It is not assessed yet.
    Due(String, Snapshot),
}

impl Documents {
    /// Assesses what is due next and keeps the outcome; nothing where all is fresh. Blocks while it works.
    pub fn check_next(&self) -> Option<Outcome> {
        let (name, snapshot) = {
            let mut state = self.lock();
            let name = state.due()?;
            (name, state.snapshot())
        };
        self.check(&name, snapshot)
    }

    /// The assessments that the client was not told of yet.
    pub fn untold(&self) -> Vec<Arc<Checked>> {
        self.lock().untold()
    }

    /// The document as its text stands now; nothing where it is not open, or the checker failed on it.
    pub fn now(&self, name: &str) -> Option<Now> {
        let mut state = self.lock();
        let open = state.document(name)?;
        if open.failed == Some(open.stamp) {
            return None;
        }
        if let Some(checked) = open.checked.as_ref().filter(|checked| state.is_fresh(checked)) {
            return Some(Now::Checked(checked.clone()));
        }
        Some(Now::Due(name.to_owned(), state.snapshot()))
    }

    /// The assessment of that text, made where there is none yet. Blocks while it works.
    pub fn settle(&self, now: Now) -> Option<Arc<Checked>> {
        match now {
            Now::Checked(checked) => Some(checked),
            Now::Due(name, snapshot) => self.check(&name, snapshot)?.result.ok(),
        }
    }

    fn check(&self, name: &str, snapshot: Snapshot) -> Option<Outcome> {
        let stamp = snapshot.open.get(name)?.stamp;
        let before = self.lock().document(name).and_then(|open| open.checked.clone());
        let policy = Policy { today: crate::today(), ..Policy::default() };
        let result = assess(&self.assessor, policy, snapshot, name, before.as_deref())?.map(Arc::new);
        let mut state = self.lock();
        if let Some(open) = state.document_mut(name) {
            match &result {
                // A newer one that came in between stays.
                Ok(checked) if open.checked.as_ref().is_none_or(|old| old.snapshot_is_older(checked)) => {
                    open.checked = Some(checked.clone());
                    open.told = false;
                }
                Err(_) if open.stamp == stamp => open.failed = Some(stamp),
                _ => {}
            }
        }
        drop(state);
        // Who asks for an assessment leaves the telling of it to the one task that tells.
        self.changed.notify_one();
        Some(Outcome { name: name.to_owned(), result: result.map_err(|said| (said, stamp)) })
    }
}

impl Checked {
    fn snapshot_is_older(&self, other: &Self) -> bool {
        self.snapshot.moment <= other.snapshot.moment
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::server::documents::Change;

    const FAMILY: &str = "cbspec 1\nfamily Big\n    DC time constant: 45 ms\n";
    const BAY: &str = "cbspec 1\nuse \"family.cbspec\"\nbreaker Bay like Big\n    rated voltage: 145 kV\n";

    fn has(checked: &Checked, rule: &str) -> bool {
        checked.assessment.findings().iter().any(|finding| finding.rule == rule)
    }

    #[test]
    fn an_open_document_is_preferred_to_a_file() {
        let documents = Documents::new(Assessor::standard());
        documents.open("file:///nowhere/bay.cbspec", 1, BAY.to_owned());
        let checked = documents.now("/nowhere/bay.cbspec").and_then(|now| documents.settle(now)).expect("assessed");
        assert!(has(&checked, "use-unreadable"), "{:?}", checked.assessment.findings());
        assert_eq!(checked.read.len(), 2);
        documents.open("file:///nowhere/family.cbspec", 1, FAMILY.to_owned());
        let checked = documents.now("/nowhere/bay.cbspec").and_then(|now| documents.settle(now)).expect("assessed");
        assert!(!has(&checked, "use-unreadable"));
    }

    #[test]
    fn what_uses_a_changed_document_is_due_again() {
        let documents = Documents::new(Assessor::standard());
        documents.open("file:///nowhere/family.cbspec", 1, FAMILY.to_owned());
        documents.open("file:///nowhere/bay.cbspec", 1, BAY.to_owned());
        let checked = |documents: &Documents| {
            let mut names = Vec::new();
            while let Some(outcome) = documents.check_next() {
                names.push(outcome.name);
            }
            names
        };
        assert_eq!(checked(&documents), ["/nowhere/family.cbspec", "/nowhere/bay.cbspec"]);
        assert!(checked(&documents).is_empty());
        let change = Change { range: None, text: FAMILY.replace("45", "60") };
        documents.change("file:///nowhere/family.cbspec", 2, vec![change]).expect("newer");
        assert_eq!(checked(&documents), ["/nowhere/family.cbspec", "/nowhere/bay.cbspec"]);
        let change = Change { range: None, text: BAY.replace("145", "170") };
        documents.change("file:///nowhere/bay.cbspec", 2, vec![change]).expect("newer");
        assert_eq!(checked(&documents), ["/nowhere/bay.cbspec"]);
        documents.close("file:///nowhere/family.cbspec");
        assert_eq!(checked(&documents), ["/nowhere/bay.cbspec"]);
    }
}
