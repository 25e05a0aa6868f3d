//! Code actions: the repairs of findings, a deviation for a finding, and `from duty` written out.

use std::sync::Arc;

use firstpole_core::particular::SheetKind;
use firstpole_core::rules::reading;
use firstpole_core::sheet::Sheet;
use firstpole_core::{Assessment, Edit, FileId, Finding, Span};

use super::hints::hints;
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
    /// The change.
    pub edit: Edit,
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
                edit: edit.clone(),
            });
        }
    }
    for finding in findings() {
        if let Some(edit) = deviation(assessment, finding) {
            actions.push(Action { title: edit.title.clone(), finding: Some(finding), preferred: false, edit });
        }
    }
    actions.extend(written_out(assessment, file, within));
    actions
}

/// `from duty` replaced by what it chose.
fn written_out<'a>(assessment: &Assessment, file: FileId, within: Span) -> Option<Action<'a>> {
    let sheet = sheet_at(assessment, file, within.start)?;
    let (statement, _) = statement_at(assessment, sheet, within.start)?;
    let value = statement.value;
    let end = assessment.span(value).end;
    let chosen = hints(assessment, file, Span::new(end, end));
    // Where several breakers take the line over and chose differently, no one value is right.
    let [hint] = chosen.as_slice() else { return None };
    let text = hint.value.clone();
    let title = format!("write {text}, as the duty asks");
    Some(Action { title: title.clone(), finding: None, preferred: false, edit: Edit { title, place: value, text } })
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

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, assessed, at_cursor};

    fn applied(assessment: &Assessment, text: &str, edit: &Edit) -> String {
        let mut text = text.to_owned();
        let span = assessment.span(edit.place);
        text.replace_range(span.start as usize..span.end as usize, &edit.text);
        text
    }

    #[test]
    fn every_repair_is_offered() {
        let text = BAY.replace("lowest ambient", "lowest ambiant");
        let at = text.find("ambiant").expect("the slip") as u32;
        let assessment = assessed(&text);
        let actions = actions(&assessment, FileId(0), Span::new(at, at));
        let action = actions.first().expect("a repair");
        assert_eq!(action.finding.expect("a finding").rule, "unknown-label");
        assert_eq!(applied(&assessment, &text, &action.edit), BAY);
    }

    #[test]
    fn a_deviation_accepts_its_finding_once_it_is_filled_in() {
        for (newline, named) in [("\n", "LineBay"), ("\r\n", "\"Bay 1\"")] {
            let text = BAY.replace("145 kV", "150 kV").replace("LineBay", named).replace('\n', newline);
            let assessment = assessed(&text);
            let finding = assessment.findings().iter().find(|f| f.rule == "rated-voltage-not-preferred").expect("one");
            let actions = actions(&assessment, FileId(0), assessment.span(finding.place));
            let action = actions.iter().find(|a| a.title.starts_with("add a deviation from rated-v")).expect("offered");
            let after = applied(&assessment, &text, &action.edit)
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
        let after = assessed(&applied(&assessment, BAY, &action.edit));
        assert!(
            after.findings().iter().all(|f| after.at(f.place).span.start != assessment.span(action.edit.place).start),
            "{:?}",
            action.edit
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
