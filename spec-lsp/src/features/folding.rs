//! Folding: every sheet, and every run of comments.

use firstpole_core::source::LineAt;
use firstpole_core::{Assessment, FileId, Span};
use firstpole_grammar::LineKind;

use super::spot::{sheets_of, text_of};

/// A part that can be folded.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Fold {
    /// From the line that stays to the last one that is hidden.
    pub span: Span,
    /// Whether it is a comment.
    pub comment: bool,
}

/// The parts of a file that can be folded, in the order of the text.
pub fn folds(assessment: &Assessment, file: FileId) -> Vec<Fold> {
    let Some(source) = assessment.sources.file(file) else { return Vec::new() };
    let sheets = sheets_of(assessment, file).map(|sheet| Fold {
        span: Span::new(assessment.span(sheet.heading).start, assessment.span(sheet.end).end),
        comment: false,
    });
    let mut folds: Vec<Fold> = sheets.collect();
    let is_comment = |line: &LineAt<'_>| {
        matches!(line.kind, LineKind::Blank) && text_of(source, *line).trim_start().starts_with('#')
    };
    let lines: Vec<LineAt<'_>> = source.lines().collect();
    for run in lines.chunk_by(|a, b| is_comment(a) == is_comment(b)) {
        if let (Some(first), Some(last), true) = (run.first(), run.last(), run.first().is_some_and(is_comment)) {
            folds.push(Fold { span: Span::new(first.start, last.start + last.len), comment: true });
        }
    }
    folds.retain(|fold| fold.span.of(&source.text).contains(['\n', '\r']));
    folds.sort_by_key(|fold| fold.span);
    folds
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{assessed, text_of};

    #[test]
    fn sheets_and_runs_of_comments() {
        let assessment = assessed("# a\n# b\ncbspec 1\nsite Yard\n    altitude: 10 m\n    # c\n\nsite Empty\n# d\n");
        let texts: Vec<_> = folds(&assessment, FileId(0)).iter().map(|fold| text_of(&assessment, fold.span)).collect();
        assert_eq!(texts, ["# a\n# b", "site Yard\n    altitude: 10 m"]);
    }
}
