//! What stands at an offset.

use firstpole_core::particular::{Lookup, SheetKind, find};
use firstpole_core::sheet::{Sheet, Statement};
use firstpole_core::source::SourceFile;
use firstpole_core::{Assessment, FileId, Place, Span};
use firstpole_grammar::{Line, LineKind, Look};

/// The line of a file that holds an offset.
pub fn line_at(file: &SourceFile, offset: u32) -> Option<&Line> {
    let lines = &file.document.lines;
    let after = lines.partition_point(|line| line.start <= offset);
    lines.get(after.checked_sub(1)?)
}

/// The text of a line, without its ending.
pub fn text_of<'a>(file: &'a SourceFile, line: &Line) -> &'a str {
    Span::new(line.start, line.start + line.len).of(&file.text)
}

/// The sheet that an offset stands in: the last one that begins before it, the line of its heading included.
pub fn sheet_at(assessment: &Assessment, file: FileId, offset: u32) -> Option<&Sheet> {
    let source = assessment.sources.file(file)?;
    let line = line_at(source, offset)?;
    let end = line.start + line.len;
    sheets_of(assessment, file).take_while(|sheet| sheet.heading.span.start <= end).last()
}

/// The sheets of one file.
pub fn sheets_of(assessment: &Assessment, file: FileId) -> impl Iterator<Item = &Sheet> {
    assessment.set.sheets.iter().filter(move |sheet| sheet.file() == file)
}

/// The statement whose label or value an offset touches, and whether it is the value.
pub fn statement_at(sheet: &Sheet, offset: u32) -> Option<(&Statement, bool)> {
    let label = |statement: &&Statement| statement.label.span.touches(offset);
    let value = |statement: &&Statement| statement.value.span.touches(offset) && !statement.value.span.is_empty();
    sheet
        .statements
        .iter()
        .find(value)
        .map(|statement| (statement, true))
        .or_else(|| sheet.statements.iter().find(label).map(|statement| (statement, false)))
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
    assessment.set.sheets.iter().flat_map(move |sheet| {
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
    names(assessment).find(|named| named.place.file == file && named.place.span.touches(offset))
}

/// The label and the text of the value of a line, broken or not; places are in the text.
pub fn label_and_value(line: &Line) -> Option<(Span, Span)> {
    match &line.kind {
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
        let (statement, value) = statement_at(sheet, at).expect("a statement");
        assert_eq!((statement.particular.label, value), ("DC time constant", false));
        assert!(statement_at(sheet, at + 17).expect("a statement").1);
    }

    #[test]
    fn names_stand_in_headings_and_links() {
        let (assessment, at) = bay_after("LineBay on Ring");
        let named = name_at(&assessment, FileId(0), at).expect("a name");
        assert_eq!((named.sheet.title().as_str(), named.own), ("system Ring132", false));
        assert_eq!(names(&assessment).count(), 7);
    }
}
