//! The stable json of an assessment, `schema: 1`. Lines and columns are one-based, columns in Unicode characters; values of the
//! duty are in SI base units and `null` where they cannot be known.

use std::collections::BTreeMap;

use serde::Serialize;

use crate::assess::Assessment;
use crate::finding::{Acceptance, FindingKind};
use crate::source::{Place, Position};

/// The whole document.
#[derive(Debug, Serialize)]
pub struct Document {
    schema: u32,
    findings: Vec<JsonFinding>,
    cases: Vec<JsonCase>,
    summary: BTreeMap<&'static str, usize>,
}

#[derive(Debug, Serialize)]
struct JsonFinding {
    rule: &'static str,
    kind: FindingKind,
    accepted: bool,
    #[serde(skip_serializing_if = "Option::is_none")]
    acceptance: Option<Acceptance>,
    file: String,
    breaker: Option<String>,
    start: Position,
    end: Position,
    message: String,
    basis: String,
    stated: Option<String>,
    needed: Option<String>,
    #[serde(skip_serializing_if = "Option::is_none")]
    stated_value: Option<f64>,
    #[serde(skip_serializing_if = "Option::is_none")]
    needed_value: Option<f64>,
    working: Vec<String>,
    advice: Option<String>,
    related: Vec<JsonRelated>,
    edits: Vec<JsonEdit>,
}

#[derive(Debug, Serialize)]
struct JsonRelated {
    file: String,
    start: Position,
    end: Position,
    message: String,
}

#[derive(Debug, Serialize)]
struct JsonEdit {
    title: String,
    file: String,
    start: Position,
    end: Position,
    text: String,
}

#[derive(Debug, Serialize)]
struct JsonCase {
    breaker: String,
    duty: BTreeMap<&'static str, Option<JsonFigure>>,
}

#[derive(Debug, Serialize)]
struct JsonFigure {
    value: f64,
    unit: &'static str,
    working: String,
}

impl Document {
    /// The document of an assessment.
    pub fn of(assessment: &Assessment) -> Self {
        let findings = assessment
            .findings()
            .iter()
            .map(|finding| {
                let (file, start, end) = span(assessment, finding.place);
                JsonFinding {
                    rule: finding.rule,
                    kind: finding.kind,
                    accepted: finding.accepted.is_some(),
                    acceptance: finding.accepted.clone(),
                    file,
                    breaker: finding.breaker.clone(),
                    start,
                    end,
                    message: finding.message.clone(),
                    basis: finding.basis.clone(),
                    stated: finding.stated.as_ref().map(|datum| datum.text.clone()),
                    needed: finding.needed.as_ref().map(|datum| datum.text.clone()),
                    stated_value: finding.stated.as_ref().and_then(|datum| datum.si).map(told),
                    needed_value: finding.needed.as_ref().and_then(|datum| datum.si).map(told),
                    working: finding.working.clone(),
                    advice: finding.advice.clone(),
                    related: finding
                        .related
                        .iter()
                        .map(|related| {
                            let (file, start, end) = span(assessment, related.place);
                            JsonRelated { file, start, end, message: related.message.clone() }
                        })
                        .collect(),
                    edits: finding
                        .edits
                        .iter()
                        .map(|edit| {
                            let (file, start, end) = span(assessment, edit.place);
                            JsonEdit { title: edit.title.clone(), file, start, end, text: edit.text.clone() }
                        })
                        .collect(),
                }
            })
            .collect();
        let cases = assessment
            .cases()
            .iter()
            .map(|case| JsonCase {
                breaker: case.breaker.clone(),
                duty: case
                    .duty
                    .iter()
                    .map(|figure| {
                        let known = figure.value.map(|value| JsonFigure {
                            value: told(value),
                            unit: figure.unit,
                            working: figure.working.clone().unwrap_or_default(),
                        });
                        (figure.key, known)
                    })
                    .collect(),
            })
            .collect();
        let mut summary: BTreeMap<&'static str, usize> =
            FindingKind::ALL.into_iter().map(|kind| (kind.word(), assessment.count(kind))).collect();
        summary.insert("accepted", assessment.accepted());
        Self { schema: 1, findings, cases, summary }
    }
}

/// Nine significant digits: what the last bits of a logarithm are differs between machines, and the json must not.
fn told(value: f64) -> f64 {
    format!("{value:.8e}").parse().unwrap_or(value)
}

fn span(assessment: &Assessment, place: Place) -> (String, Position, Position) {
    let at = assessment.sources.at(place);
    match assessment.sources.file(at.file) {
        Some(file) => (file.name.clone(), file.position(at.span.start), file.position(at.span.end)),
        None => (String::new(), Position { line: 1, column: 1 }, Position { line: 1, column: 1 }),
    }
}
