//! The outline: sheets with their particulars.

use firstpole_core::sheet::About;
use firstpole_core::{Assessment, FileId, Span};

use super::spot::{line_at, sheets_of};

/// An entry of the outline.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Symbol {
    /// What it is called.
    pub name: String,
    /// What stands there.
    pub detail: String,
    /// All of it.
    pub span: Span,
    /// What is marked when one goes there.
    pub selection: Span,
    /// The particulars of a sheet.
    pub children: Vec<Symbol>,
}

/// The outline of a file.
pub fn symbols(assessment: &Assessment, file: FileId) -> Vec<Symbol> {
    let Some(source) = assessment.sources.file(file) else { return Vec::new() };
    sheets_of(assessment, file)
        .map(|sheet| {
            let mut children: Vec<Symbol> = sheet
                .statements
                .iter()
                .map(|statement| {
                    let label = assessment.span(statement.label);
                    let name = match statement.about {
                        About::Value => statement.particular.label.to_owned(),
                        About::Reason => format!("reason for {}", statement.particular.label),
                        About::Tested => format!("type-tested {}", statement.particular.label),
                    };
                    let value = assessment.span(statement.value);
                    let detail = value.of(&source.text).to_owned();
                    let span = Span::new(label.start, label.end.max(value.end));
                    Symbol { name, detail, span, selection: label, children: Vec::new() }
                })
                .chain(sheet.own.iter().map(|own| {
                    let value = assessment.span(own.place);
                    let start = line_at(source, value.start).map_or(value.start, |line| line.start);
                    let (name, detail) = (own.label.clone(), own.text.clone());
                    Symbol { name, detail, span: Span::new(start, value.end), selection: value, children: Vec::new() }
                }))
                .collect();
            children.sort_by_key(|symbol| symbol.span.start);
            // A client refuses an entry without a name.
            children.retain(|symbol| !symbol.name.trim().is_empty());
            let (name, heading) = (assessment.span(sheet.name_place), assessment.span(sheet.heading));
            let links = source.text.get(name.end as usize..heading.end as usize);
            Symbol {
                name: sheet.title(),
                detail: links.unwrap_or("").trim().to_owned(),
                span: Span::new(heading.start, assessment.span(sheet.end).end.max(heading.end)),
                selection: name,
                children,
            }
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, assessed, text_of};

    #[test]
    fn sheets_with_their_particulars() {
        let assessment = assessed(&(BAY.to_owned() + "    \"own words\": \"yes\"\n"));
        let symbols = symbols(&assessment, FileId(0));
        let names: Vec<_> = symbols.iter().map(|symbol| symbol.name.as_str()).collect();
        assert_eq!(names, ["system Ring132", "site Yard", "breaker LineBay", "circuit Line1"]);
        let bay = symbols.get(2).expect("the breaker");
        assert_eq!(bay.detail, "on Ring132 at Yard");
        let isc = bay.children.get(1).expect("Isc");
        assert_eq!((isc.name.as_str(), isc.detail.as_str()), ("rated short-circuit breaking current", "31.5 kA"));
        assert_eq!(text_of(&assessment, isc.span), "Isc:                31.5 kA");
        let circuit = symbols.last().expect("the circuit");
        assert_eq!(circuit.children.last().expect("own").name, "own words");
    }

    #[test]
    fn what_is_marked_lies_within() {
        let assessment = assessed("breaker\n    rated voltage:\ntender \"A\" on x\n  x y z\n");
        for symbol in symbols(&assessment, FileId(0)) {
            for part in symbol.children.iter().chain([&symbol]) {
                assert!(part.span.start <= part.selection.start && part.selection.end <= part.span.end, "{part:?}");
            }
        }
    }
}
