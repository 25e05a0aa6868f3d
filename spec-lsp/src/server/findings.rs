//! Findings as the client is told of them. They are written straight from the findings, since there may be a thousand of them after
//! every keystroke.

use std::fmt::Write;
use std::sync::Arc;

use firstpole_core::{FilePlace, Finding, Place};
use lsp_types as lsp;
use serde::ser::{Serialize, SerializeMap, Serializer};

use super::checker::{Checked, OWN};
use super::positions::View;
use crate::features::diagnostics::{self, Severity};

/// Who says it, beside every finding.
pub const SOURCE: &str = "firstpole";

/// The most findings that are told of one file.
pub const MOST: usize = 1000;

/// What a client takes of a finding beside where it is and what it says.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Takes {
    /// Other places that it rests on.
    pub related: bool,
    /// Marks, such as on text that does nothing.
    pub marks: bool,
    /// What comes back to the server with a question about it: its repairs.
    pub data: bool,
}

/// A finding with its places as the client counts them.
#[derive(Clone, Debug, PartialEq)]
pub struct Told {
    /// Where.
    pub range: lsp::Range,
    finding: Arc<Finding>,
    related: Vec<Spot>,
    edits: Vec<Spot>,
    marks: bool,
}

/// A place in a document of the client.
#[derive(Clone, Debug, PartialEq)]
struct Spot {
    uri: Arc<str>,
    range: lsp::Range,
}

impl Told {
    /// How grave.
    pub fn severity(&self) -> Severity {
        diagnostics::severity(&self.finding)
    }

    /// As the types of the protocol have it.
    pub fn typed(&self) -> Option<lsp::Diagnostic> {
        serde_json::to_value(self).and_then(serde_json::from_value).ok()
    }
}

/// The gravest findings by the names of the files; the document itself is among them even where nothing was found.
pub fn told(checked: &Checked) -> Vec<(String, Vec<Told>)> {
    let assessment = &checked.assessment;
    let desk = Desk::new(checked);
    let mut by_file: Vec<Vec<&Arc<Finding>>> = assessment.sources.files().map(|_| Vec::new()).collect();
    for finding in assessment.findings() {
        if let Some(file) = by_file.get_mut(assessment.at(finding.place).file.0 as usize) {
            file.push(finding);
        }
    }
    let mut all = Vec::new();
    for ((file, source), mut found) in assessment.sources.files().zip(by_file) {
        if found.len() > MOST {
            found.sort_by_key(|finding| diagnostics::severity(finding));
            found.truncate(MOST);
        }
        if file == OWN || !found.is_empty() {
            all.push((source.name.clone(), found.into_iter().filter_map(|finding| desk.told(finding)).collect()));
        }
    }
    all
}

/// One finding as the client is told of it.
pub fn told_of(checked: &Checked, finding: &Arc<Finding>) -> Option<Told> {
    Desk::new(checked).told(finding)
}

/// What is the same for all findings of an assessment.
struct Desk<'a> {
    checked: &'a Checked,
    uris: Vec<Arc<str>>,
}

impl<'a> Desk<'a> {
    fn new(checked: &'a Checked) -> Self {
        let files = checked.assessment.sources.files();
        Self { checked, uris: files.map(|(_, source)| checked.snapshot.uri(&source.name).into()).collect() }
    }

    fn told(&self, finding: &Arc<Finding>) -> Option<Told> {
        let takes = self.checked.snapshot.takes;
        let spots = |places: &mut dyn Iterator<Item = Place>, wanted: bool| -> Vec<Spot> {
            if wanted { places.filter_map(|place| self.spot(place)).collect() } else { Vec::new() }
        };
        let range = self.range(self.checked.assessment.at(finding.place))?;
        let related = spots(&mut finding.related.iter().map(|related| related.place), takes.related);
        let edits = spots(&mut finding.edits.iter().map(|edit| edit.place), takes.data);
        Some(Told { range, finding: finding.clone(), related, edits, marks: takes.marks })
    }

    fn spot(&self, place: Place) -> Option<Spot> {
        let at = self.checked.assessment.at(place);
        Some(Spot { uri: self.uris.get(at.file.0 as usize)?.clone(), range: self.range(at)? })
    }

    fn range(&self, at: FilePlace) -> Option<lsp::Range> {
        let source = self.checked.assessment.sources.file(at.file)?;
        let view = View { text: &source.text, starts: source.line_starts() };
        let (start, end) = view.range(at.span, self.checked.snapshot.encoding);
        let position = |at: super::positions::Position| lsp::Position::new(at.line, at.column);
        Some(lsp::Range::new(position(start), position(end)))
    }
}

impl Serialize for Told {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let mut map = serializer.serialize_map(None)?;
        map.serialize_entry("range", &self.range)?;
        let severity = match self.severity() {
            Severity::Error => lsp::DiagnosticSeverity::ERROR,
            Severity::Warning => lsp::DiagnosticSeverity::WARNING,
            Severity::Information => lsp::DiagnosticSeverity::INFORMATION,
            Severity::Hint => lsp::DiagnosticSeverity::HINT,
        };
        map.serialize_entry("severity", &severity)?;
        map.serialize_entry("code", self.finding.rule)?;
        map.serialize_entry("source", SOURCE)?;
        map.serialize_entry("message", &diagnostics::message(&self.finding))?;
        if !self.related.is_empty() {
            map.serialize_entry("relatedInformation", &RelatedList(self))?;
        }
        if self.marks && diagnostics::is_idle(&self.finding) {
            map.serialize_entry("tags", &[lsp::DiagnosticTag::UNNECESSARY])?;
        }
        if !self.edits.is_empty() {
            map.serialize_entry("data", &Data(self))?;
        }
        map.end()
    }
}

struct RelatedList<'a>(&'a Told);

impl Serialize for RelatedList<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let all = self.0.related.iter().zip(&self.0.finding.related);
        serializer.collect_seq(all.map(|(spot, related)| OneRelated { spot, message: &related.message }))
    }
}

struct OneRelated<'a> {
    spot: &'a Spot,
    message: &'a str,
}

impl Serialize for OneRelated<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let mut map = serializer.serialize_map(Some(2))?;
        map.serialize_entry("location", self.spot)?;
        map.serialize_entry("message", self.message)?;
        map.end()
    }
}

impl Serialize for Spot {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let mut map = serializer.serialize_map(Some(2))?;
        map.serialize_entry("uri", &*self.uri)?;
        map.serialize_entry("range", &self.range)?;
        map.end()
    }
}

struct Data<'a>(&'a Told);

impl Serialize for Data<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let mut map = serializer.serialize_map(Some(1))?;
        map.serialize_entry("edits", &EditList(self.0))?;
        map.end()
    }
}

struct EditList<'a>(&'a Told);

impl Serialize for EditList<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let all = self.0.edits.iter().zip(&self.0.finding.edits);
        serializer.collect_seq(all.map(|(spot, edit)| OneEdit { spot, title: &edit.title, text: &edit.text }))
    }
}

struct OneEdit<'a> {
    spot: &'a Spot,
    title: &'a str,
    text: &'a str,
}

impl Serialize for OneEdit<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        let mut map = serializer.serialize_map(Some(4))?;
        map.serialize_entry("title", self.title)?;
        map.serialize_entry("uri", &*self.spot.uri)?;
        map.serialize_entry("range", &self.spot.range)?;
        map.serialize_entry("newText", self.text)?;
        map.end()
    }
}

enum Entry<'a> {
    Found(&'a Told),
    Fault,
}

impl Serialize for Entry<'_> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        match self {
            Self::Found(told) => told.serialize(serializer),
            Self::Fault => fault().serialize(serializer),
        }
    }
}

/// What is said of a text on which the checker failed.
pub fn fault() -> lsp::Diagnostic {
    lsp::Diagnostic {
        severity: Some(lsp::DiagnosticSeverity::ERROR),
        source: Some(SOURCE.to_owned()),
        message: "internal fault: this text could not be assessed; please report it with the text".to_owned(),
        ..lsp::Diagnostic::default()
    }
}

/// The notification that tells a client of the findings of a document, as a body of the wire.
///
/// `fault` says that the checker failed on the text; what was found last stays.
pub fn notification(uri: &str, version: Option<i32>, fault: bool, all: &[&Told]) -> Vec<u8> {
    let mut head = String::from(r#"{"jsonrpc":"2.0","method":"textDocument/publishDiagnostics","params":{"uri":"#);
    // Writing into memory cannot fail, and every key is a text.
    head.push_str(&serde_json::to_string(uri).unwrap_or_default());
    if let Some(version) = version {
        let _ = write!(head, r#","version":{version}"#);
    }
    head.push_str(r#","diagnostics":"#);
    let mut body = head.into_bytes();
    body.reserve(all.len() * 512);
    let fault = fault.then_some(Entry::Fault);
    let all = fault.into_iter().chain(all.iter().map(|told| Entry::Found(told)));
    let _ = serde_json::Serializer::new(&mut body).collect_seq(all);
    body.extend_from_slice(b"}}");
    body
}

#[cfg(test)]
mod tests {
    use firstpole_core::Assessor;
    use firstpole_core::rules::Policy;

    use super::super::checker::assess;
    use super::super::documents::Documents;
    use super::*;

    const BAY: &str = "cbspec 1\nsystem Ring\n    highest voltage: 145 kV\nbreaker Bay on Ring\n    rated voltage: 150 kV\n    Isc: 31,5 kA\n";

    fn checked(takes: Takes) -> Checked {
        let documents = Documents::new(Assessor::standard());
        documents.open("file:///nowhere/bay.cbspec", 1, BAY.to_owned());
        let mut snapshot = documents.lock().snapshot();
        snapshot.takes = takes;
        assess(&Assessor::standard(), Policy::default(), snapshot, "/nowhere/bay.cbspec", None)
            .expect("open")
            .expect("no panic")
    }

    #[test]
    fn the_wire_says_what_the_types_say() {
        let all = told(&checked(Takes { related: true, marks: true, data: true }));
        let (_, own) = all.first().expect("the document");
        assert!(!own.is_empty());
        let body = notification("file:///nowhere/bay.cbspec", Some(3), false, &own.iter().collect::<Vec<_>>());
        let body: serde_json::Value = serde_json::from_slice(&body).expect("json");
        let params: lsp::PublishDiagnosticsParams = serde_json::from_value(body["params"].clone()).expect("typed");
        assert_eq!(params.version, Some(3));
        assert_eq!(params.diagnostics, own.iter().filter_map(Told::typed).collect::<Vec<_>>());
        let voltage = params.diagnostics.iter().find(|d| d.data.is_some()).expect("a repair");
        assert!(voltage.data.as_ref().expect("data")["edits"][0]["newText"].is_string());
    }

    #[test]
    fn what_a_client_does_not_take_is_left_out() {
        let all = told(&checked(Takes::default()));
        let text = serde_json::to_string(&all.first().expect("the document").1).expect("json");
        assert!(!text.contains("relatedInformation") && !text.contains("\"data\""), "{text}");
    }
}
