//! Hints in the text: what `from duty` chose.

use firstpole_core::case::Case;
use firstpole_core::particular::SheetKind;
use firstpole_core::rules::Policy;
use firstpole_core::{Assessment, FileId, Place, Span};

/// A hint in the text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Hint {
    /// After which byte it is shown.
    pub at: u32,
    /// What it says.
    pub text: String,
    /// The value that was chosen, as an author would write it.
    pub value: String,
    /// How that came about.
    pub working: String,
}

/// The hints of the part `within` of a file. A value that several breakers take over gets one for each that chose otherwise.
pub fn hints(assessment: &Assessment, file: FileId, within: Span) -> Vec<Hint> {
    let policy = Policy::default();
    let Some(source) = assessment.sources.file(file) else { return Vec::new() };
    let mut hints: Vec<Hint> = Vec::new();
    let here = |place: Place| {
        let at = assessment.at(place);
        at.file == file && within.touches(at.span.end)
    };
    for sheet in assessment.set.of_kind(SheetKind::Breaker) {
        // Most sheets leave nothing to the duty, and a case is the dearest thing there is.
        let asks = assessment.set.resolved(sheet.id).iter().any(|statement| {
            here(statement.value) && matches!(statement.reading, firstpole_core::sheet::Reading::FromDuty)
        });
        if !asks {
            continue;
        }
        let case = Case::new(&assessment.set, sheet, &policy);
        for statement in case.breaker.statements() {
            let (Some(working), Some(quantity)) = (&statement.chosen, statement.quantity()) else { continue };
            if !here(statement.value) {
                continue;
            }
            let own = statement.value.block() == sheet.heading.block();
            let value = quantity.shown();
            let text = if own { value.clone() } else { format!("{value} in {}", sheet.name) };
            let hint = Hint { at: assessment.span(statement.value).end, text, value, working: working.clone() };
            if !hints.contains(&hint) {
                hints.push(hint);
            }
        }
    }
    hints.retain(|hint| hint.at as usize <= source.text.len());
    hints.sort_by(|a, b| (a.at, &a.text).cmp(&(b.at, &b.text)));
    hints
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, assessed};

    const ALL: Span = Span::new(0, 100_000);

    #[test]
    fn what_was_chosen_stands_behind_the_value() {
        let hints = hints(&assessed(BAY), FileId(0), ALL);
        let [hint] = hints.as_slice() else { panic!("{hints:?}") };
        assert!(BAY.get(..hint.at as usize).expect("before").ends_with("from duty"));
        assert!(hint.text.ends_with(" kA") || hint.text.contains("kA peak"), "{}", hint.text);
        assert!(!hint.working.is_empty());
    }

    #[test]
    fn only_what_is_seen() {
        assert!(hints(&assessed(BAY), FileId(0), Span::new(0, 40)).is_empty());
        let unknown = BAY.replace("Isc:                31.5 kA\n", "");
        assert!(hints(&assessed(&unknown), FileId(0), ALL).is_empty());
    }

    #[test]
    fn what_is_taken_over_names_the_breaker() {
        let text = BAY.replace("    making current:     from duty\n", "").replace("at Yard\n", "at Yard like Big\n")
            + "family Big\n    making current: from duty\n";
        let hints = hints(&assessed(&text), FileId(0), ALL);
        assert_eq!(hints.len(), 1);
        assert!(hints.first().is_some_and(|hint| hint.text.ends_with(" in LineBay")), "{hints:?}");
    }
}
