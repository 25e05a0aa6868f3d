//! Every specification of the workspace: those that are open as they stand in the editor, the others as they lie in the folders.

use std::path::Path;
use std::sync::Arc;

use super::checker::{Checked, assess_by_settings};
use super::documents::{Documents, Known};
use crate::files::{below_folder, read, shown};

impl Documents {
    /// Assesses every specification of the workspace whose text, or that of a file that it uses, may hold `word`; without a word all.
    /// Blocks while it works. What cannot be read is left out: its findings come when it is opened.
    pub fn everywhere(&self, word: Option<&str>, mut each: impl FnMut(&Checked)) {
        let snapshot = self.lock().snapshot();
        let open: Vec<String> = snapshot.open.keys().cloned().collect();
        for name in &open {
            if let Some(checked) = self.now(name).and_then(|now| self.settle(now)) {
                each(&checked);
            }
        }
        for path in snapshot.roots.iter().flat_map(|root| below_folder(root)) {
            let name = shown(&path);
            let Some(text) = unopened(&path, &name, &open) else { continue };
            if word.is_some_and(|word| memchr::memmem::find(text.as_bytes(), word.as_bytes()).is_none()) {
                continue;
            }
            let mut snapshot = snapshot.clone();
            let known = Known { uri: super::names::uri_of(&name), stamp: 0, text };
            snapshot.open.insert(name.clone(), known);
            if let Some(Ok(checked)) = assess_by_settings(&self.assessor, snapshot, &name, None) {
                each(&checked);
            }
        }
    }
}

fn unopened(path: &Path, name: &str, open: &[String]) -> Option<Arc<str>> {
    if open.iter().any(|open| open == name) {
        return None;
    }
    read(path).ok()
}
