//! Code actions: the repairs of findings, one by one or all of a rule; a deviation for a finding; what is missing; `from duty`
//! written out; other units; a family for what breakers have in common.

mod convert;
mod family;
mod missing;

pub use missing::labels as missing_labels;

use std::sync::Arc;

use firstpole_core::particular::SheetKind;
use firstpole_core::rules::reading;
use firstpole_core::sheet::Sheet;
use firstpole_core::{Assessment, Edit, FileId, Finding, Span};

use super::hints::chosen;
use super::spot::{sheet_at, statement_at};

/// What an editor can offer to do.
#[derive(Clone, Debug, PartialEq)]
pub struct Action<'a> {
    /// What it does.
    pub title: String,
    /// The finding that it mends.
    pub finding: Option<&'a Arc<Finding>>,
    /// The one thing to do about it.
    pub preferred: bool,
    /// What it is.
    pub kind: ActionKind,
    /// The changes, none of which touches another.
    pub edits: Vec<Edit>,
}

/// What an action is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ActionKind {
    /// It mends a finding.
    Repair,
    /// It writes the same in another way.
    Rewrite,
    /// It moves what several share to a place of its own.
    Extract,
}

impl Action<'_> {
    fn rewrite(edit: Edit) -> Self {
        Self {
            title: edit.title.clone(),
            finding: None,
            preferred: false,
            kind: ActionKind::Rewrite,
            edits: vec![edit],
        }
    }
}

/// What can be done within a part of a file.
pub fn actions(assessment: &Assessment, file: FileId, within: Span) -> Vec<Action<'_>> {
    let mut actions = Vec::new();
    let here = |finding: &&Arc<Finding>| {
        let at = assessment.at(finding.place);
        at.file == file && at.span.start <= within.end && within.start <= at.span.end
    };
    let findings = || assessment.findings().iter().filter(here);
    for finding in findings() {
        for edit in &finding.edits {
            actions.push(Action {
                title: edit.title.clone(),
                finding: Some(finding),
                preferred: finding.edits.len() == 1,
                kind: ActionKind::Repair,
                edits: vec![edit.clone()],
            });
        }
    }
    let mut rules: Vec<&str> = Vec::new();
    for finding in findings() {
        if !rules.contains(&finding.rule) {
            rules.push(finding.rule);
            actions.extend(all_of_rule(assessment, file, finding));
        }
    }
    for finding in findings() {
        if let Some(edit) = deviation(assessment, finding) {
            let title = edit.title.clone();
            actions.push(Action {
                title,
                finding: Some(finding),
                preferred: false,
                kind: ActionKind::Repair,
                edits: vec![edit],
            });
        }
    }
    actions.extend(written_out(assessment, file, within));
    actions.extend(convert::conversions(assessment, file, within.start).into_iter().map(Action::rewrite));
    if let Some(sheet) = sheet_at(assessment, file, within.start).filter(|sheet| sheet.file() == file) {
        actions.extend(missing::added(assessment, sheet).map(Action::rewrite));
        let family = family::offered(assessment, file, sheet, within.start);
        actions.extend(family.map(|(title, edits)| Action {
            title,
            finding: None,
            preferred: false,
            kind: ActionKind::Extract,
            edits,
        }));
    }
    actions
}

/// The repairs of all findings of one rule in a file, where each has one repair and there are several.
fn all_of_rule<'a>(assessment: &Assessment, file: FileId, finding: &'a Arc<Finding>) -> Option<Action<'a>> {
    let mut edits: Vec<Edit> = Vec::new();
    let here = |place| assessment.at(place).file == file;
    let same = |other: &&Arc<Finding>| other.rule == finding.rule && here(other.place) && other.accepted.is_none();
    for other in assessment.findings().iter().filter(same) {
        let [edit] = other.edits.as_slice() else { continue };
        // What several breakers take over is mended once; of two repairs that meet, the first.
        let meets = edits.iter().any(|known| known.place == edit.place || known.place.overlaps(edit.place));
        if here(edit.place) && !meets {
            edits.push(edit.clone());
        }
    }
    (edits.len() > 1).then(|| Action {
        title: format!("repair all {} findings of {} in this file", edits.len(), finding.rule),
        finding: Some(finding),
        preferred: false,
        kind: ActionKind::Repair,
        edits,
    })
}

/// `from duty` replaced by what it chose.
fn written_out<'a>(assessment: &Assessment, file: FileId, within: Span) -> Option<Action<'a>> {
    let sheet = sheet_at(assessment, file, within.start)?;
    let (statement, _) = statement_at(assessment, sheet, within.start)?;
    let value = statement.value;
    let end = assessment.span(value).end;
    let chosen = chosen(assessment, file, Span::new(end, end));
    // Where several breakers take the line over and chose differently, no one value is right.
    let [hint] = chosen.as_slice() else { return None };
    let text = hint.value.clone()?;
    let title = format!("write {text}, as the duty asks");
    Some(Action::rewrite(Edit { title, place: value, text }))
}

/// A deviation for a finding, at the end of the file of the sheet that it is about.
fn deviation(assessment: &Assessment, finding: &Finding) -> Option<Edit> {
    let accepts_nothing = finding.rule.starts_with("deviation-") || reading::ALL.iter().any(|r| r.name == finding.rule);
    if finding.accepted.is_some() || accepts_nothing {
        return None;
    }
    let sheet = sheet_of(assessment, finding)?;
    let source = assessment.sources.file(sheet.file())?;
    let newline = if source.text.contains("\r\n") { "\r\n" } else { "\n" };
    let end = source.text.len() as u32;
    let gap = if source.text.ends_with(['\n', '\r']) { newline.to_owned() } else { newline.repeat(2) };
    let name = written(&sheet.name)?;
    let lines = [
        format!("{gap}deviation from {} in {name}", finding.rule),
        "    reason:     \"\"".to_owned(),
        "    approved:   \"\"".to_owned(),
        "    until:".to_owned(),
        String::new(),
    ];
    Some(Edit {
        title: format!("add a deviation from {} in {}", finding.rule, sheet.name),
        place: assessment.sources.place(sheet.file(), Span::new(end, end))?,
        text: lines.join(newline),
    })
}

/// The sheet that a deviation from the finding would name.
fn sheet_of<'a>(assessment: &'a Assessment, finding: &Finding) -> Option<&'a Sheet> {
    if let Some(id) = finding.sheet {
        return assessment.set.sheet(id);
    }
    let at = assessment.at(finding.place);
    let sheet = sheet_at(assessment, at.file, at.span.start)?;
    let fits = matches!(sheet.kind, SheetKind::Breaker | SheetKind::System | SheetKind::Site | SheetKind::Tender);
    // What is no breaker's finding can only be accepted in the sheet that it stands in.
    fits.then_some(sheet)
}

/// A name as a heading has it; nothing where no heading could.
pub fn written(name: &str) -> Option<String> {
    const LINKS: [&str; 8] = ["on", "at", "into", "for", "like", "from", "through", "in"];
    let bare = !name.is_empty()
        && name.chars().all(|c| c.is_alphanumeric() || matches!(c, '_' | '-'))
        && !LINKS.contains(&name);
    if bare { Some(name.to_owned()) } else { (!name.is_empty() && !name.contains('"')).then(|| format!("\"{name}\"")) }
}

/// A text after edits, as a client makes them.
#[cfg(test)]
fn applied(assessment: &Assessment, text: &str, edits: &[Edit]) -> String {
    let mut edits: Vec<(Span, &Edit)> = edits.iter().map(|edit| (assessment.span(edit.place), edit)).collect();
    edits.sort_by_key(|(span, _)| std::cmp::Reverse((span.start, span.end)));
    let mut text = text.to_owned();
    for (span, edit) in edits {
        text.replace_range(span.start as usize..span.end as usize, &edit.text);
    }
    text
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, assessed, at_cursor};

    #[test]
    fn all_findings_of_a_rule_are_repaired_at_once() {
        let text = BAY
            .replace("-25 degC", "-25 degC\n    ambient: 40 to -25 degC")
            .replace("    DC time", "    opening time: 30 to 25 ms\n    DC time");
        let at = text.find("40 to").expect("the slip") as u32;
        let assessment = assessed(&text);
        let actions = actions(&assessment, FileId(0), Span::new(at, at));
        let all = actions.iter().find(|action| action.title == "repair all 2 findings of bounds-order in this file");
        let after = applied(&assessment, &text, &all.expect("offered").edits);
        assert!(assessed(&after).findings().iter().all(|finding| finding.rule != "bounds-order"), "{after}");
        let one = text.replace("30 to 25 ms", "30 ms");
        assert!(!super::actions(&assessed(&one), FileId(0), Span::new(at, at)).iter().any(|a| a.title.contains("all")));
    }

    #[test]
    fn every_repair_is_offered() {
        let text = BAY.replace("lowest ambient", "lowest ambiant");
        let at = text.find("ambiant").expect("the slip") as u32;
        let assessment = assessed(&text);
        let actions = actions(&assessment, FileId(0), Span::new(at, at));
        let action = actions.first().expect("a repair");
        assert_eq!(action.finding.expect("a finding").rule, "unknown-label");
        assert_eq!(applied(&assessment, &text, &action.edits), BAY);
    }

    #[test]
    fn a_deviation_accepts_its_finding_once_it_is_filled_in() {
        for (newline, named) in [("\n", "LineBay"), ("\r\n", "\"Bay 1\"")] {
            let text = BAY.replace("145 kV", "150 kV").replace("LineBay", named).replace('\n', newline);
            let assessment = assessed(&text);
            let finding = assessment.findings().iter().find(|f| f.rule == "rated-voltage-not-preferred").expect("one");
            let actions = actions(&assessment, FileId(0), assessment.span(finding.place));
            let action = actions.iter().find(|a| a.title.starts_with("add a deviation from rated-v")).expect("offered");
            let unfilled = assessed(&applied(&assessment, &text, &action.edits));
            assert!(unfilled.findings().iter().any(|f| f.rule == "deviation-incomplete"));
            let after = applied(&assessment, &text, &action.edits)
                .replacen("\"\"", "\"as before\"", 2)
                .replace("until:", "until: 2099-12-31");
            let accepted = assessed(&after);
            let finding = accepted.findings().iter().find(|f| f.rule == "rated-voltage-not-preferred").expect("one");
            assert!(finding.accepted.is_some(), "{after}");
            assert_eq!(after.contains("\r\n"), newline == "\r\n");
        }
    }

    #[test]
    fn from_duty_is_written_out() {
        let (assessment, at) = at_cursor(&BAY.replace("from duty", "from| duty"));
        let actions = actions(&assessment, FileId(0), Span::new(at, at));
        let action = actions.iter().find(|action| action.finding.is_none()).expect("offered");
        let after = assessed(&applied(&assessment, BAY, &action.edits));
        assert!(
            after
                .findings()
                .iter()
                .all(|f| action.edits.iter().all(|e| after.span(f.place).start != assessment.span(e.place).start)),
            "{:?}",
            action.edits
        );
    }

    #[test]
    fn no_deviation_from_what_cannot_be_read() {
        let text = BAY.replace("145 kV", "145");
        let at = text.find("145\n").expect("the slip") as u32;
        let assessment = assessed(&text);
        let actions = actions(&assessment, FileId(0), Span::new(at, at + 3));
        assert!(!actions.is_empty());
        assert!(!actions.iter().any(|action| action.title.contains("deviation from unit-missing")), "{actions:?}");
    }

    #[test]
    fn names_are_quoted_where_they_have_to_be() {
        assert_eq!(written("Bay-1").as_deref(), Some("Bay-1"));
        assert_eq!(written("Bay 1").as_deref(), Some("\"Bay 1\""));
        assert_eq!(written("on").as_deref(), Some("\"on\""));
        assert_eq!(written(""), None);
    }
}
