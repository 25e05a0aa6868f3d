//! Answers to clients that ask for findings instead of being told of them, and tokens as far as they have changed.

use std::hash::{DefaultHasher, Hash, Hasher};

use lsp_types as lsp;

use super::checker::Checked;
use super::findings::{self, Told};

/// What tells one state of all that an assessment rests on from another.
pub fn state_of(checked: &Checked) -> String {
    let mut hasher = DefaultHasher::new();
    for read in &checked.read {
        (&read.name, read.stamp).hash(&mut hasher);
    }
    checked.disk.hash(&mut hasher);
    format!("{:016x}", hasher.finish())
}

/// The findings on the document itself, unless the client has them already.
fn report(checked: &Checked, known: Option<&str>) -> Result<lsp::FullDocumentDiagnosticReport, String> {
    let state = state_of(checked);
    if known == Some(state.as_str()) {
        return Err(state);
    }
    let own = findings::told(checked).into_iter().find(|(name, _)| *name == checked.name);
    let items = own.map(|(_, found)| found.iter().filter_map(Told::typed).collect()).unwrap_or_default();
    Ok(lsp::FullDocumentDiagnosticReport { result_id: Some(state), items })
}

/// Answers for one document.
pub fn document(checked: Option<&Checked>, known: Option<&str>) -> lsp::DocumentDiagnosticReportResult {
    let report = match checked.map(|checked| report(checked, known)) {
        Some(Err(result_id)) => {
            lsp::DocumentDiagnosticReport::Unchanged(lsp::RelatedUnchangedDocumentDiagnosticReport {
                unchanged_document_diagnostic_report: lsp::UnchangedDocumentDiagnosticReport { result_id },
                related_documents: None,
            })
        }
        Some(Ok(full)) => full_report(full),
        // The checker failed on the text.
        None => full_report(lsp::FullDocumentDiagnosticReport { result_id: None, items: vec![findings::fault()] }),
    };
    lsp::DocumentDiagnosticReportResult::Report(report)
}

const fn full_report(full: lsp::FullDocumentDiagnosticReport) -> lsp::DocumentDiagnosticReport {
    lsp::DocumentDiagnosticReport::Full(lsp::RelatedFullDocumentDiagnosticReport {
        full_document_diagnostic_report: full,
        related_documents: None,
    })
}

/// Answers for one document among all of the workspace.
pub fn of_workspace(
    checked: &Checked,
    version: Option<i32>,
    known: &[lsp::PreviousResultId],
) -> Option<lsp::WorkspaceDocumentDiagnosticReport> {
    let uri = lsp::Url::parse(&checked.snapshot.uri(&checked.name)).ok()?;
    let version = version.map(i64::from);
    let known = known.iter().find(|known| known.uri == uri).map(|known| known.value.as_str());
    Some(match report(checked, known) {
        Ok(full) => lsp::WorkspaceDocumentDiagnosticReport::Full(lsp::WorkspaceFullDocumentDiagnosticReport {
            uri,
            version,
            full_document_diagnostic_report: full,
        }),
        Err(result_id) => {
            lsp::WorkspaceDocumentDiagnosticReport::Unchanged(lsp::WorkspaceUnchangedDocumentDiagnosticReport {
                uri,
                version,
                unchanged_document_diagnostic_report: lsp::UnchangedDocumentDiagnosticReport { result_id },
            })
        }
    })
}

/// What turns old tokens into new ones: the one stretch between what they have in common at both ends.
pub fn delta(old: &[lsp::SemanticToken], new: &[lsp::SemanticToken]) -> Vec<lsp::SemanticTokensEdit> {
    let start = old.iter().zip(new).take_while(|(old, new)| old == new).count();
    let (old, new) = (old.get(start..).unwrap_or(&[]), new.get(start..).unwrap_or(&[]));
    let end = old.iter().rev().zip(new.iter().rev()).take_while(|(old, new)| old == new).count();
    let (gone, put) = (old.len() - end, new.get(..new.len() - end).unwrap_or(&[]));
    if gone == 0 && put.is_empty() {
        return Vec::new();
    }
    // The protocol counts numbers, of which a token has five.
    let numbers = |tokens: usize| 5 * tokens as u32;
    vec![lsp::SemanticTokensEdit {
        start: numbers(start),
        delete_count: numbers(gone),
        data: (!put.is_empty()).then(|| put.to_vec()),
    }]
}

#[cfg(test)]
mod tests {
    use super::*;

    fn tokens(lengths: &[u32]) -> Vec<lsp::SemanticToken> {
        let token = |length: &u32| lsp::SemanticToken {
            delta_line: 1,
            delta_start: 0,
            length: *length,
            token_type: 0,
            token_modifiers_bitset: 0,
        };
        lengths.iter().map(token).collect()
    }

    #[test]
    fn edits_turn_the_old_into_the_new() {
        for (old, new) in [
            (&[1, 2, 3][..], &[1, 9, 3][..]),
            (&[1, 2, 3], &[1, 2, 3]),
            (&[1, 1, 1], &[1, 1]),
            (&[], &[4]),
            (&[4], &[]),
            (&[1, 2], &[1, 2, 1, 2]),
        ] {
            let (old, new) = (tokens(old), tokens(new));
            let mut made = old.clone();
            for edit in delta(&old, &new) {
                let start = edit.start as usize / 5;
                made.splice(start..start + edit.delete_count as usize / 5, edit.data.unwrap_or_default());
            }
            assert_eq!(made, new);
        }
        assert!(delta(&tokens(&[1]), &tokens(&[1])).is_empty());
    }
}
