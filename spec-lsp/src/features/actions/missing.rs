//! What the omissions of a sheet ask for, added as open points.

use std::sync::Arc;

use firstpole_core::particular::{SheetKind, declared};
use firstpole_core::sheet::Sheet;
use firstpole_core::{Assessment, Edit, Finding, FindingKind};

/// Labels that the omissions in a sheet ask for and that it does not have, in the order in which they are asked for.
pub fn labels(assessment: &Assessment, sheet: &Sheet) -> Vec<&'static str> {
    let facts = assessment.set.facts(sheet.id);
    let here = |finding: &&Arc<Finding>| {
        finding.kind == FindingKind::Omission
            && finding.accepted.is_none()
            && finding.place.block() == sheet.heading.block()
    };
    let mut found: Vec<&'static str> = Vec::new();
    for finding in assessment.findings().iter().filter(here) {
        let Some(advice) = finding.advice.as_ref().filter(|advice| advice.starts_with("add ")) else { continue };
        for label in asked_for(sheet.kind, advice) {
            let stated = facts.statements().iter().any(|statement| statement.particular.label == label);
            if !stated && !found.contains(&label) {
                found.push(label);
            }
        }
    }
    found
}

/// The labels of a kind of sheet in an advice; of two ways to say a thing (`X/R or DC time constant`) the first.
fn asked_for(kind: SheetKind, advice: &str) -> Vec<&'static str> {
    // An advice to add a sheet names the particulars of that one.
    if SheetKind::ALL.iter().any(|kind| advice.contains(&format!("sheet {}", kind.word()))) {
        return Vec::new();
    }
    let mut found: Vec<(usize, &'static str)> = Vec::new();
    for particular in declared(kind) {
        let label = particular.label;
        for (at, _) in advice.match_indices(label) {
            let apart = |c: Option<char>| c.is_none_or(|c| !c.is_alphanumeric() && c != '-' && c != '/');
            let before = advice.get(..at).and_then(|text| text.chars().next_back());
            let after = advice.get(at + label.len()..).and_then(|text| text.chars().next());
            if apart(before) && apart(after) {
                found.push((at, label));
            }
        }
    }
    // Of labels in labels the longest.
    let inside = |(at, label): (usize, &str)| {
        found.iter().any(|(other, longer)| {
            longer.len() > label.len() && *other <= at && at + label.len() <= other + longer.len()
        })
    };
    let mut whole: Vec<(usize, &'static str)> = found.iter().copied().filter(|found| !inside(*found)).collect();
    whole.sort_unstable();
    let second_way = |at: usize| advice.get(..at).is_some_and(|before| before.ends_with(" or "));
    whole.into_iter().filter(|(at, _)| !second_way(*at)).map(|(_, label)| label).collect()
}

/// Adds them, each as a line without a value, which reads as an open point.
pub fn added(assessment: &Assessment, sheet: &Sheet) -> Option<Edit> {
    let labels = labels(assessment, sheet);
    if labels.is_empty() {
        return None;
    }
    let source = assessment.sources.file(sheet.file())?;
    let newline = if source.text.contains("\r\n") { "\r\n" } else { "\n" };
    let lines: Vec<String> = labels.iter().map(|label| format!("{newline}    {label}:")).collect();
    let text = lines.concat();
    Some(Edit {
        title: format!("add what is missing in {}: {}", sheet.title(), labels.join(", ")),
        place: sheet.end.end(),
        text,
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, assessed};

    fn sheet<'a>(assessment: &'a Assessment, title: &str) -> &'a Sheet {
        assessment.set.sheets().find(|sheet| sheet.title() == title).expect("a sheet")
    }

    #[test]
    fn what_is_added_reads_as_open_points() {
        let assessment = assessed(BAY);
        let edit = added(&assessment, sheet(&assessment, "site Yard")).expect("something is missing");
        assert!(edit.text.contains("\n    altitude:") && edit.text.contains("\n    highest ambient:"), "{edit:?}");
        let mut text = BAY.to_owned();
        text.insert_str(assessment.span(edit.place).start as usize, &edit.text);
        let after = assessed(&text);
        let findings = |assessment: &Assessment, rule: &str| {
            assessment.findings().iter().filter(|finding| finding.rule == rule).count()
        };
        assert!(findings(&after, "open-point") > findings(&assessment, "open-point"));
        let asked = labels(&after, sheet(&after, "site Yard"));
        assert!(asked.is_empty(), "{asked:?}");
    }

    #[test]
    fn of_two_ways_the_first_and_of_labels_in_labels_the_longest() {
        let told = asked_for(SheetKind::System, "add single-phase short-circuit current and X/R or DC time constant");
        assert_eq!(told, ["single-phase short-circuit current", "X/R"]);
        assert!(asked_for(SheetKind::Breaker, "add a sheet site with quantity").is_empty());
    }

    #[test]
    fn nothing_where_nothing_is_missing() {
        let text =
            BAY.replace("-25 degC", "-25 degC\n    highest ambient: 40 degC\n    altitude: 10 m\n    pollution: c");
        let assessment = assessed(&text);
        assert_eq!(added(&assessment, sheet(&assessment, "site Yard")), None);
    }
}
