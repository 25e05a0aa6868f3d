//! Findings as `miette` shows them, over a source that knows where its lines start.
//!
//! `miette` panics on a span past the end, draws no label without width at the end of a file, and scans a text from its start
//! for each snippet; the line index and the clamping here are for that.

use firstpole_grammar::Span;
use miette::{
    Diagnostic, LabeledSpan, MietteError, MietteSpanContents, Severity, SourceCode, SourceSpan, SpanContents,
};

use super::{Finding, FindingKind};
use crate::assess::Assessment;
use crate::source::SourceFile;

/// A file of the set as `miette` reads it.
#[derive(Clone, Copy, Debug)]
pub struct IndexedSource<'a>(pub &'a SourceFile);

impl SourceCode for IndexedSource<'_> {
    fn read_span<'a>(
        &'a self,
        span: &SourceSpan,
        before: usize,
        after: usize,
    ) -> Result<Box<dyn SpanContents<'a> + 'a>, MietteError> {
        let starts = self.0.line_starts();
        let len = self.0.text.len();
        let start = span.offset().min(len);
        let end = (start + span.len()).min(len);
        let line_of = |offset: usize| starts.partition_point(|s| *s as usize <= offset).saturating_sub(1);
        let first = line_of(start).saturating_sub(before);
        let last = line_of(end) + after;
        let from = starts.get(first).map_or(0, |s| *s as usize);
        let to = starts.get(last + 1).map_or(len, |s| *s as usize);
        let data = self.0.text.as_bytes().get(from..to).ok_or(MietteError::OutOfBounds)?;
        // The name of the file with line and column stands in our own header; this column is only miette's own.
        let column = if before == 0 { start - from } else { 0 };
        let contents = MietteSpanContents::new_named(
            self.0.name.clone(),
            data,
            SourceSpan::new(from.into(), to - from),
            first,
            column,
            // Lines of this piece: by them miette tells which pieces touch and are drawn as one.
            (last + 1).min(starts.len()).saturating_sub(first),
        );
        Ok(Box::new(contents))
    }
}

/// A finding as `miette` shows it.
#[derive(Debug)]
pub struct FindingDiagnostic<'a> {
    finding: &'a Finding,
    source: Option<IndexedSource<'a>>,
    labels: Vec<LabeledSpan>,
    /// Statements in other files that it rests on, each with its own snippet.
    elsewhere: Vec<Elsewhere<'a>>,
}

#[derive(Debug)]
struct Elsewhere<'a> {
    message: &'a str,
    source: Option<IndexedSource<'a>>,
    label: LabeledSpan,
}

impl<'a> FindingDiagnostic<'a> {
    /// The finding with the sources that it points into.
    pub fn new(finding: &'a Finding, assessment: &'a Assessment) -> Self {
        let at = assessment.sources.at(finding.place);
        let source = assessment.sources.file(at.file).map(IndexedSource);
        let own = Some(finding.label.clone()).filter(|label| !label.is_empty());
        let mut labels = vec![LabeledSpan::new_primary_with_span(own, span(source, at.span))];
        let mut elsewhere = Vec::new();
        for related in &finding.related {
            let place = assessment.sources.at(related.place);
            if place.file == at.file {
                labels.push(LabeledSpan::new_with_span(Some(related.message.clone()), span(source, place.span)));
            } else {
                let source = assessment.sources.file(place.file).map(IndexedSource);
                let label = LabeledSpan::new_with_span(None, span(source, place.span));
                elsewhere.push(Elsewhere { message: &related.message, source, label });
            }
        }
        Self { finding, source, labels, elsewhere }
    }
}

/// The span clamped to the text; one without width is put on the character at it, or on the last one.
fn span(source: Option<IndexedSource<'_>>, place: Span) -> SourceSpan {
    let Some(IndexedSource(file)) = source else { return (0, 0).into() };
    let text: &str = &file.text;
    let end = (place.end as usize).min(text.len());
    let start = (place.start as usize).min(end);
    if start < end {
        return (start, end - start).into();
    }
    let here = text.get(start..).and_then(|rest| rest.chars().next()).filter(|c| !matches!(c, '\n' | '\r'));
    match here {
        Some(c) => (start, c.len_utf8()).into(),
        None => {
            let before = text.get(..start).and_then(|rest| rest.chars().next_back());
            let width = before.filter(|c| !matches!(c, '\n' | '\r')).map_or(0, char::len_utf8);
            (start - width, width).into()
        }
    }
}

impl std::fmt::Display for FindingDiagnostic<'_> {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str(&self.finding.message)
    }
}

impl std::error::Error for FindingDiagnostic<'_> {}

impl Diagnostic for FindingDiagnostic<'_> {
    fn code<'a>(&'a self) -> Option<Box<dyn std::fmt::Display + 'a>> {
        let breaker = self.finding.breaker.as_deref().map(|b| format!(" in {b}")).unwrap_or_default();
        let accepted = if self.finding.accepted.is_some() { ", accepted" } else { "" };
        Some(Box::new(format!("{}{accepted}: {}{breaker}", self.finding.kind.word(), self.finding.rule)))
    }

    fn severity(&self) -> Option<Severity> {
        Some(match self.finding.kind {
            _ if self.finding.accepted.is_some() => Severity::Advice,
            FindingKind::Contradiction | FindingKind::Shortfall => Severity::Error,
            FindingKind::Omission | FindingKind::Caution => Severity::Warning,
            FindingKind::Excess | FindingKind::Remark => Severity::Advice,
        })
    }

    fn help<'a>(&'a self) -> Option<Box<dyn std::fmt::Display + 'a>> {
        let mut lines: Vec<String> = Vec::new();
        lines.extend(self.finding.working.iter().cloned());
        lines.extend(self.finding.advice.iter().cloned());
        let edits: Vec<&str> = self.finding.edits.iter().map(|edit| edit.title.as_str()).collect();
        if !edits.is_empty() {
            lines.push(format!("repair: {}", edits.join("; or ")));
        }
        lines.push(format!("basis: {}", self.finding.basis));
        if let Some(acceptance) = &self.finding.accepted {
            lines
                .push(format!("accepted by {} until {}: {}", acceptance.approved, acceptance.until, acceptance.reason));
        }
        Some(Box::new(lines.join("\n")))
    }

    fn source_code(&self) -> Option<&dyn SourceCode> {
        self.source.as_ref().map(|source| source as &dyn SourceCode)
    }

    fn labels(&self) -> Option<Box<dyn Iterator<Item = LabeledSpan> + '_>> {
        Some(Box::new(self.labels.iter().cloned()))
    }

    fn related<'a>(&'a self) -> Option<Box<dyn Iterator<Item = &'a dyn Diagnostic> + 'a>> {
        if self.elsewhere.is_empty() {
            return None;
        }
        Some(Box::new(self.elsewhere.iter().map(|e| e as &dyn Diagnostic)))
    }
}

impl std::fmt::Display for Elsewhere<'_> {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.write_str(self.message)
    }
}

impl std::error::Error for Elsewhere<'_> {}

impl Diagnostic for Elsewhere<'_> {
    fn severity(&self) -> Option<Severity> {
        Some(Severity::Advice)
    }

    fn source_code(&self) -> Option<&dyn SourceCode> {
        self.source.as_ref().map(|source| source as &dyn SourceCode)
    }

    fn labels(&self) -> Option<Box<dyn Iterator<Item = LabeledSpan> + '_>> {
        Some(Box::new(std::iter::once(self.label.clone())))
    }
}
