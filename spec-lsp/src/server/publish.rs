//! Telling the client: assesses what has changed, and publishes what was found, never for a text that is no longer the newest.

use std::collections::{BTreeMap, BTreeSet};
use std::sync::Arc;

use lsp_types::{Diagnostic, DiagnosticSeverity, Range, Url};
use tokio::sync::mpsc;

use super::checker::{Checked, Outcome};
use super::documents::{Documents, State};
use super::names::uri_of;
use super::protocol::{self, SOURCE};

/// The most findings that are published for one file.
pub const MOST_DIAGNOSTICS: usize = 1000;

/// Something that the client is told unasked.
#[derive(Debug)]
pub enum Tell {
    /// The findings of a file.
    Diagnostics {
        /// The file.
        uri: Url,
        /// The version of its text; absent where it is not open.
        version: Option<i32>,
        /// The findings.
        diagnostics: Vec<Diagnostic>,
    },
    /// A line for the log.
    Fault(String),
}

/// Assesses and tells, until nobody listens any more.
pub async fn run(documents: Arc<Documents>, out: mpsc::Sender<Tell>) {
    let mut shown = Shown::default();
    loop {
        let working = documents.clone();
        let round = tokio::task::spawn_blocking(move || {
            let outcome = working.check_next();
            let untold = working.untold();
            let found = untold.into_iter().map(|checked| (protocol::diagnostics(&checked), checked));
            (outcome, found.collect::<Vec<_>>())
        });
        let Ok((outcome, untold)) = round.await else { continue };
        let idle = outcome.is_none() && untold.is_empty();
        let mut tells = shown.drop_closed(&documents.lock());
        if let Some(Outcome { name, result: Err((said, stamp)) }) = &outcome {
            tells.push(Tell::Fault(format!("the assessment of {name} failed: {said}")));
            tells.extend(shown.fault(&documents.lock(), name, *stamp));
        }
        for (found, checked) in untold {
            tells.extend(shown.take(&documents.lock(), &checked, found));
        }
        for tell in tells {
            if out.send(tell).await.is_err() {
                return;
            }
        }
        if idle {
            documents.changed.notified().await;
        }
    }
}

/// What every document has to say on every file; a file that several use hears from all of them.
#[derive(Debug, Default)]
struct Shown {
    by_document: BTreeMap<String, BTreeMap<String, Share>>,
}

/// What one document has to say on one file.
#[derive(Debug)]
struct Share {
    /// The number of the file's text; absent where it is not open.
    stamp: Option<u64>,
    diagnostics: Vec<Diagnostic>,
}

impl Shown {
    /// Takes an assessment in, and tells the files that it concerns.
    fn take(&mut self, state: &State, checked: &Checked, found: Vec<(String, Vec<Diagnostic>)>) -> Vec<Tell> {
        let mut shares = BTreeMap::new();
        for (name, diagnostics) in found {
            let stamp = checked.read.iter().find(|read| read.name == name).and_then(|read| read.stamp);
            shares.insert(name, Share { stamp, diagnostics });
        }
        self.replace(state, &checked.name, shares)
    }

    /// Says of a document that the checker failed on it; what was found last stays.
    fn fault(&mut self, state: &State, name: &str, stamp: u64) -> Vec<Tell> {
        let mut shares = self.by_document.remove(name).unwrap_or_default();
        let share = shares.entry(name.to_owned()).or_insert_with(|| Share { stamp: None, diagnostics: Vec::new() });
        share.stamp = Some(stamp);
        share.diagnostics.retain(|diagnostic| diagnostic.code.is_some());
        share.diagnostics.insert(
            0,
            Diagnostic {
                range: Range::default(),
                severity: Some(DiagnosticSeverity::ERROR),
                source: Some(SOURCE.to_owned()),
                message: "internal fault: this text could not be assessed; please report it with the text".to_owned(),
                ..Diagnostic::default()
            },
        );
        self.replace(state, name, shares)
    }

    /// Forgets documents that are open no more, and tells the files that they concerned.
    fn drop_closed(&mut self, state: &State) -> Vec<Tell> {
        let closed: Vec<String> =
            self.by_document.keys().filter(|name| state.document(name).is_none()).cloned().collect();
        closed.iter().flat_map(|name| self.replace(state, name, BTreeMap::new())).collect()
    }

    fn replace(&mut self, state: &State, document: &str, shares: BTreeMap<String, Share>) -> Vec<Tell> {
        let mut concerned: BTreeSet<String> = shares.keys().cloned().collect();
        let old = if shares.is_empty() {
            self.by_document.remove(document)
        } else {
            self.by_document.insert(document.to_owned(), shares)
        };
        concerned.extend(old.into_iter().flat_map(BTreeMap::into_keys));
        concerned.iter().filter_map(|file| self.tell(state, file)).collect()
    }

    /// All that is known of a file; nothing where its text has changed since.
    fn tell(&self, state: &State, file: &str) -> Option<Tell> {
        let open = state.document(file);
        let own = self.by_document.get(file).and_then(|shares| shares.get(file));
        // An open document is told of when its own assessment is there; what others say of it goes along.
        if open.is_some() && own.and_then(|own| own.stamp) != open.map(|open| open.stamp) {
            return None;
        }
        let stamp = open.map(|open| open.stamp);
        let others =
            self.by_document.iter().filter(|(name, _)| *name != file).filter_map(|(_, shares)| shares.get(file));
        let mut diagnostics: Vec<Diagnostic> = Vec::new();
        for share in own.into_iter().chain(others).filter(|share| share.stamp == stamp) {
            let new = share.diagnostics.iter().filter(|new| !diagnostics.contains(new)).cloned().collect::<Vec<_>>();
            diagnostics.extend(new);
        }
        let uri = open.map_or_else(|| uri_of(file), |open| open.uri.clone());
        let version = open.map(|open| open.version);
        Some(Tell::Diagnostics { uri: Url::parse(&uri).ok()?, version, diagnostics: capped(diagnostics) })
    }
}

/// The gravest ones, in the order of the text.
fn capped(mut diagnostics: Vec<Diagnostic>) -> Vec<Diagnostic> {
    let grave = |diagnostic: &Diagnostic| diagnostic.severity.unwrap_or(DiagnosticSeverity::HINT);
    if diagnostics.len() > MOST_DIAGNOSTICS {
        diagnostics.sort_by_key(grave);
        diagnostics.truncate(MOST_DIAGNOSTICS);
    }
    diagnostics.sort_by_key(|diagnostic| (diagnostic.range.start, diagnostic.range.end, grave(diagnostic)));
    diagnostics
}

#[cfg(test)]
mod tests {
    use firstpole_core::Assessor;

    use super::*;

    const URI: &str = "file:///nowhere/bay.cbspec";

    fn told(tells: &[Tell]) -> Vec<(String, Option<i32>, usize)> {
        tells
            .iter()
            .filter_map(|tell| match tell {
                Tell::Diagnostics { uri, version, diagnostics } => {
                    Some((uri.path().to_owned(), *version, diagnostics.len()))
                }
                Tell::Fault(_) => None,
            })
            .collect()
    }

    fn round(documents: &Documents, shown: &mut Shown) -> Vec<Tell> {
        let mut tells = shown.drop_closed(&documents.lock());
        while documents.check_next().is_some() {}
        for checked in documents.untold() {
            tells.extend(shown.take(&documents.lock(), &checked, protocol::diagnostics(&checked)));
        }
        tells
    }

    #[test]
    fn what_is_outdated_is_not_told() {
        let documents = Documents::new(Assessor::standard());
        documents.open(URI, 1, "rubbish".to_owned());
        while documents.check_next().is_some() {}
        let untold = documents.untold();
        documents.change(URI, 2, Vec::new()).expect("newer");
        let mut shown = Shown::default();
        let old = untold.first().expect("one");
        assert!(told(&shown.take(&documents.lock(), old, protocol::diagnostics(old))).is_empty());
        assert_eq!(told(&round(&documents, &mut shown)), [("/nowhere/bay.cbspec".to_owned(), Some(2), 2)]);
        assert!(round(&documents, &mut shown).is_empty(), "told once");
    }

    #[test]
    fn closing_clears() {
        let documents = Documents::new(Assessor::standard());
        let mut shown = Shown::default();
        documents.open(URI, 1, "rubbish".to_owned());
        round(&documents, &mut shown);
        documents.close(URI);
        assert_eq!(told(&round(&documents, &mut shown)), [("/nowhere/bay.cbspec".to_owned(), None, 0)]);
        assert!(shown.by_document.is_empty());
    }

    #[test]
    fn the_gravest_are_kept() {
        let of = |severity, line| Diagnostic {
            severity: Some(severity),
            range: Range::new(lsp_types::Position::new(line, 0), lsp_types::Position::new(line, 1)),
            ..Diagnostic::default()
        };
        let mut all: Vec<_> = (0..2000).map(|line| of(DiagnosticSeverity::WARNING, line)).collect();
        all.push(of(DiagnosticSeverity::ERROR, 5000));
        let capped = capped(all);
        assert_eq!(capped.len(), MOST_DIAGNOSTICS);
        assert_eq!(capped.last().expect("one").severity, Some(DiagnosticSeverity::ERROR));
    }
}
