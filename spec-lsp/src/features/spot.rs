//! What stands at an offset.

use std::sync::Arc;

use firstpole_core::particular::{Lookup, SheetKind, find};
use firstpole_core::sheet::{Sheet, Statement};
use firstpole_core::source::{LineAt, SourceFile};
use firstpole_core::{Assessment, FileId, Place, Span};
use firstpole_grammar::{LineKind, Look};

/// The line of a file that holds an offset.
pub fn line_at(file: &SourceFile, offset: u32) -> Option<LineAt<'_>> {
    file.lines_touching(Span::new(offset, offset)).last()
}

/// The text of a line, without its ending.
pub fn text_of<'a>(file: &'a SourceFile, line: LineAt<'_>) -> &'a str {
    line.span().of(&file.text)
}

/// The sheet that an offset stands in: the last one that begins before it, the line of its heading included.
pub fn sheet_at(assessment: &Assessment, file: FileId, offset: u32) -> Option<&Sheet> {
    let source = assessment.sources.file(file)?;
    let line = line_at(source, offset)?;
    let end = line.start + line.len;
    sheets_of(assessment, file).take_while(|sheet| assessment.span(sheet.heading).start <= end).last()
}

/// The sheets of one file.
pub fn sheets_of(assessment: &Assessment, file: FileId) -> impl Iterator<Item = &Sheet> {
    assessment.set.sheets().filter(move |sheet| sheet.file() == file)
}

/// The statement whose label or value an offset touches, and whether it is the value.
pub fn statement_at<'a>(assessment: &Assessment, sheet: &'a Sheet, offset: u32) -> Option<(&'a Statement, bool)> {
    let touches = |place: Place| assessment.span(place).touches(offset);
    let statements = || sheet.statements.iter().map(Arc::as_ref);
    let value = statements().find(|statement| !statement.value.is_empty() && touches(statement.value));
    let label = || statements().find(|statement| touches(statement.label));
    value.map(|statement| (statement, true)).or_else(|| label().map(|statement| (statement, false)))
}

/// A name of a sheet in a heading.
#[derive(Clone, Copy, Debug)]
pub struct Named<'a> {
    /// The sheet that it names.
    pub sheet: &'a Sheet,
    /// Where the name stands.
    pub place: Place,
    /// Whether it is the name of the sheet's own heading.
    pub own: bool,
}

/// Every name of a sheet in the headings of the set, file by file.
pub fn names(assessment: &Assessment) -> impl Iterator<Item = Named<'_>> {
    assessment.set.sheets().flat_map(move |sheet| {
        let own = (!sheet.name.is_empty()).then_some(Named { sheet, place: sheet.name_place, own: true });
        let links = sheet.links.iter().filter_map(move |(link, place)| {
            let target = sheet.target(&link.word).and_then(|id| assessment.set.sheet(id))?;
            // The resolver takes the first link of each word; the text says which sheet that is.
            (target.name == link.name.text).then_some(Named { sheet: target, place: *place, own: false })
        });
        own.into_iter().chain(links)
    })
}

/// The name of a sheet that an offset touches.
pub fn name_at(assessment: &Assessment, file: FileId, offset: u32) -> Option<Named<'_>> {
    names(assessment).find(|named| {
        let at = assessment.at(named.place);
        at.file == file && at.span.touches(offset)
    })
}

/// The label and the text of the value of a line, broken or not; places are in the text.
pub fn label_and_value(line: LineAt<'_>) -> Option<(Span, Span)> {
    match line.kind {
        LineKind::Particular(particular) if !particular.own => {
            Some((line.place(particular.label_span), line.place(particular.value.span)))
        }
        LineKind::Broken { look: Look::Particular { label, rest }, .. } => {
            Some((line.place(*label), line.place(*rest)))
        }
        _ => None,
    }
}

/// What a label means in a sheet.
pub fn particular_of(kind: SheetKind, label: &str) -> Option<&'static firstpole_core::particular::Particular> {
    use firstpole_core::particular::Found;
    match find(kind, label) {
        Lookup::Found(Found::Particular { particular, .. }) => Some(particular),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, assessed, bay_after};

    #[test]
    fn sheets_reach_to_the_next_heading() {
        for (before, title) in
            [("frequency:", "system Ring132"), ("X/R:                21\n", "system Ring132"), ("si", "site Yard")]
        {
            let (assessment, at) = bay_after(before);
            assert_eq!(sheet_at(&assessment, FileId(0), at).expect("a sheet").title(), title, "{before}");
        }
        assert!(sheet_at(&assessed(BAY), FileId(0), 2).is_none());
    }

    #[test]
    fn labels_and_values_are_told_apart() {
        let (assessment, at) = bay_after("DC time");
        let sheet = sheet_at(&assessment, FileId(0), at).expect("a sheet");
        let (statement, value) = statement_at(&assessment, sheet, at).expect("a statement");
        assert_eq!((statement.particular.label, value), ("DC time constant", false));
        assert!(statement_at(&assessment, sheet, at + 17).expect("a statement").1);
    }

    #[test]
    fn names_stand_in_headings_and_links() {
        let (assessment, at) = bay_after("LineBay on Ring");
        let named = name_at(&assessment, FileId(0), at).expect("a name");
        assert_eq!((named.sheet.title().as_str(), named.own), ("system Ring132", false));
        assert_eq!(names(&assessment).count(), 7);
    }
}
