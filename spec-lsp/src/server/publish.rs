//! Telling the client: assesses what has changed, and publishes what was found, never for a text that is no longer the newest.

use std::collections::{BTreeMap, BTreeSet};
use std::sync::Arc;

use tokio::sync::mpsc;

use super::checker::{Checked, Outcome};
use super::documents::{Documents, State};
use super::findings::{self, Told};
use super::names::uri_of;

/// Something that the client is told unasked.
#[derive(Debug)]
pub enum Tell {
    /// The findings of a file, as a body of the wire.
    Findings(Vec<u8>),
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
            let found = untold.into_iter().map(|checked| (findings::told(&checked), checked));
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
    found: Vec<Told>,
    /// Whether the checker failed on it.
    fault: bool,
}

impl Shown {
    /// Takes an assessment in, and tells the files that it concerns.
    fn take(&mut self, state: &State, checked: &Checked, found: Vec<(String, Vec<Told>)>) -> Vec<Tell> {
        let mut shares = BTreeMap::new();
        for (name, found) in found {
            let stamp = checked.read.iter().find(|read| read.name == name).and_then(|read| read.stamp);
            shares.insert(name, Share { stamp, found, fault: false });
        }
        self.replace(state, &checked.name, shares)
    }

    /// Says of a document that the checker failed on it; what was found last stays.
    fn fault(&mut self, state: &State, name: &str, stamp: u64) -> Vec<Tell> {
        let mut shares = self.by_document.remove(name).unwrap_or_default();
        let share =
            shares.entry(name.to_owned()).or_insert_with(|| Share { stamp: None, found: Vec::new(), fault: true });
        share.stamp = Some(stamp);
        share.fault = true;
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
        let mut shares = own.into_iter().chain(others).filter(|share| share.stamp == stamp);
        let mut all: Vec<&Told> = Vec::new();
        let mut fault = false;
        if let Some(first) = shares.next() {
            all.extend(&first.found);
            fault = first.fault;
        }
        for share in shares {
            let new: Vec<&Told> = share.found.iter().filter(|new| !all.contains(new)).collect();
            all.extend(new);
            fault |= share.fault;
        }
        let uri = open.map_or_else(|| uri_of(file), |open| open.uri.clone());
        let version = open.map(|open| open.version);
        Some(Tell::Findings(findings::notification(&uri, version, fault, &capped(all))))
    }
}

/// The gravest ones, in the order of the text.
fn capped(mut all: Vec<&Told>) -> Vec<&Told> {
    if all.len() > findings::MOST {
        all.sort_by_key(|told| told.severity());
        all.truncate(findings::MOST);
    }
    all.sort_by_key(|told| (told.range.start, told.range.end, told.severity()));
    all
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
                Tell::Findings(body) => {
                    let body: serde_json::Value = serde_json::from_slice(body).expect("json");
                    let params: lsp_types::PublishDiagnosticsParams =
                        serde_json::from_value(body["params"].clone()).expect("typed");
                    Some((params.uri.path().to_owned(), params.version, params.diagnostics.len()))
                }
                Tell::Fault(_) => None,
            })
            .collect()
    }

    fn round(documents: &Documents, shown: &mut Shown) -> Vec<Tell> {
        let mut tells = shown.drop_closed(&documents.lock());
        while documents.check_next().is_some() {}
        for checked in documents.untold() {
            tells.extend(shown.take(&documents.lock(), &checked, findings::told(&checked)));
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
        assert!(told(&shown.take(&documents.lock(), old, findings::told(old))).is_empty());
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
        let documents = Documents::new(Assessor::standard());
        let sites = (0..1500).map(|at| format!("site S{at}\n    altitude:\n"));
        let text = "cbspec 1\n".to_owned() + &sites.collect::<String>() + "rubbish\n";
        documents.open(URI, 1, text);
        let tells = round(&documents, &mut Shown::default());
        let [Tell::Findings(body)] = tells.as_slice() else { panic!("{}", tells.len()) };
        let body = String::from_utf8(body.clone()).expect("UTF-8");
        assert_eq!(told(&tells), [("/nowhere/bay.cbspec".to_owned(), Some(1), findings::MOST)]);
        assert!(body.contains("unreadable-line"), "the last line is the gravest");
    }
}
