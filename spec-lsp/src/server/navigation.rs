//! Answers about names, selections, lenses and the form of the text.

use std::collections::BTreeMap;

use firstpole_core::Span;
use firstpole_core::documents::align;
use firstpole_core::particular::SheetKind;
use lsp_types as lsp;

use super::checker::{Checked, OWN};
use super::protocol::Edge;
use crate::features::{definition, lens, rename, selection, spot};

/// A sheet by what holds over files: where it stands and what it is called.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct SheetName {
    /// The name of its file.
    pub file: String,
    /// What it describes.
    pub kind: SheetKind,
    /// Its name.
    pub name: String,
}

impl Edge<'_> {
    /// Answers what would be renamed.
    pub fn prepare_rename(&self, position: lsp::Position) -> Option<lsp::PrepareRenameResponse> {
        let (span, placeholder) = rename::name_to_change(&self.checked.assessment, OWN, self.offset(position)?)?;
        Some(lsp::PrepareRenameResponse::RangeWithPlaceholder { range: self.own(span)?, placeholder })
    }

    /// The sheet whose name stands there.
    pub fn sheet_named(&self, position: lsp::Position) -> Option<SheetName> {
        let assessment = &self.checked.assessment;
        let sheet = rename::sheet_to_change(assessment, OWN, self.offset(position)?)?;
        let file = assessment.sources.file(sheet.file())?.name.clone();
        Some(SheetName { file, kind: sheet.kind, name: sheet.name.clone() })
    }

    /// Answers what is marked along.
    pub fn highlights(&self, position: lsp::Position) -> Option<Vec<lsp::DocumentHighlight>> {
        let all = definition::highlights(&self.checked.assessment, OWN, self.offset(position)?);
        let highlight = |(span, own): (Span, bool)| {
            let kind = if own { lsp::DocumentHighlightKind::WRITE } else { lsp::DocumentHighlightKind::READ };
            Some(lsp::DocumentHighlight { range: self.own(span)?, kind: Some(kind) })
        };
        Some(all.into_iter().filter_map(highlight).collect())
    }

    /// Answers what selections grow to, one for each position.
    pub fn selections(&self, positions: &[lsp::Position]) -> Option<Vec<lsp::SelectionRange>> {
        let one = |position: &lsp::Position| {
            let spans = selection::around(&self.checked.assessment, OWN, self.offset(*position)?);
            let mut outer: Option<Box<lsp::SelectionRange>> = None;
            for span in spans.into_iter().rev() {
                outer = Some(Box::new(lsp::SelectionRange { range: self.own(span)?, parent: outer }));
            }
            outer.map(|selection| *selection)
        };
        positions.iter().map(one).collect()
    }

    /// Answers what stands above breakers.
    pub fn lenses(&self) -> Vec<lsp::CodeLens> {
        let lens = |lens: lens::Lens| {
            // A command without a name does nothing; the protocol has no other way to show a text.
            let command = lsp::Command { title: lens.text, command: String::new(), arguments: None };
            Some(lsp::CodeLens { range: self.own(lens.span)?, command: Some(command), data: None })
        };
        lens::lenses(&self.checked.assessment, OWN).into_iter().filter_map(lens).collect()
    }

    /// Answers how the text is aligned: all of it, or the lines that a range touches.
    pub fn aligned(&self, range: Option<lsp::Range>) -> Option<Vec<lsp::TextEdit>> {
        let within = match range {
            Some(range) => Some(self.span(range)?),
            None => None,
        };
        let text = &self.checked.assessment.sources.file(OWN)?.text;
        let edit = |change: align::Change| Some(lsp::TextEdit { range: self.own(change.span)?, new_text: change.text });
        let wanted = |change: &align::Change| {
            within.is_none_or(|within| change.span.start <= within.end && within.start < change.span.end)
        };
        Some(align::changes(text).into_iter().filter(wanted).filter_map(edit).collect())
    }
}

/// Edits of several documents by their addresses.
pub type Edits = BTreeMap<lsp::Url, Vec<lsp::TextEdit>>;

/// What a sheet's new name changes in the files of an assessment; why it cannot be called so.
pub fn renamed(checked: &Checked, sheet: &SheetName, name: &str, edits: &mut Edits) -> Result<(), String> {
    let edge = Edge { checked, abilities: super::protocol::Abilities::default() };
    let Some(own) = rename::same_sheet(&checked.assessment, &sheet.file, sheet.kind, &sheet.name) else {
        return Ok(());
    };
    let (places, text) = rename::renamed(&checked.assessment, own.id, name)?;
    for place in places {
        let Some(location) = edge.location(place) else { continue };
        let edit = lsp::TextEdit { range: location.range, new_text: text.clone() };
        let known = edits.entry(location.uri).or_default();
        if !known.contains(&edit) {
            known.push(edit);
        }
    }
    Ok(())
}

/// Where a sheet's name stands in the files of an assessment.
pub fn places_of(checked: &Checked, sheet: &SheetName, with_own: bool, found: &mut Vec<lsp::Location>) {
    let edge = Edge { checked, abilities: super::protocol::Abilities::default() };
    let Some(own) = rename::same_sheet(&checked.assessment, &sheet.file, sheet.kind, &sheet.name) else { return };
    let places = spot::names(&checked.assessment).filter(|named| named.sheet.id == own.id && (with_own || !named.own));
    for location in places.filter_map(|named| edge.location(named.place)) {
        if !found.contains(&location) {
            found.push(location);
        }
    }
}

/// The sheets of a document whose kind and name hold what is sought, letter after letter.
pub fn sheets_like(checked: &Checked, sought: &str, found: &mut Vec<lsp::SymbolInformation>) {
    let edge = Edge { checked, abilities: super::protocol::Abilities::default() };
    let sheets = spot::sheets_of(&checked.assessment, OWN).filter(|sheet| holds(&sheet.title(), sought));
    for sheet in sheets {
        let Some(location) = edge.location(sheet.heading) else { continue };
        #[allow(deprecated, reason = "the type has no other way to be made")]
        found.push(lsp::SymbolInformation {
            name: sheet.title(),
            kind: lsp::SymbolKind::CLASS,
            tags: None,
            deprecated: None,
            location,
            container_name: None,
        });
    }
}

/// Whether a text holds these letters in their order, whatever stands between them.
fn holds(text: &str, letters: &str) -> bool {
    let mut rest = text.chars().flat_map(char::to_lowercase);
    letters.chars().flat_map(char::to_lowercase).filter(|c| !c.is_whitespace()).all(|wanted| rest.any(|c| c == wanted))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn letters_in_their_order() {
        assert!(holds("breaker LineBay", "lb"));
        assert!(holds("breaker LineBay", ""));
        assert!(holds("breaker LineBay", "BREAKER line"));
        assert!(!holds("breaker LineBay", "yl"));
    }
}
