//! Particulars that breakers have in common, moved to a family.

use std::sync::Arc;

use firstpole_core::particular::SheetKind;
use firstpole_core::sheet::{Sheet, Statement};
use firstpole_core::source::{LineAt, SourceFile};
use firstpole_core::{Assessment, Edit, FileId, Place, Span};
use firstpole_grammar::LineKind;

use crate::features::spot::{line_at, particular_of, sheets_of, text_of};

/// So many particulars make a family worth its heading.
const LEAST: usize = 3;

/// The edits that give a breaker and those that share particulars with it a family.
pub fn extracted(assessment: &Assessment, sheet: &Sheet) -> Option<(String, Vec<Edit>)> {
    let file = sheet.file();
    let source = assessment.sources.file(file)?;
    let free =
        |sheet: &Sheet| sheet.kind == SheetKind::Breaker && sheet.links.iter().all(|(link, _)| link.word != "like");
    if !free(sheet) {
        return None;
    }
    let lines = own_lines(assessment, source, sheet);
    let shared = |common: &[Said<'_>], other: &Sheet| -> Vec<usize> {
        let theirs = own_lines(assessment, source, other);
        (0..common.len()).filter(|at| common.get(*at).is_some_and(|line| theirs.iter().any(|t| t.says(line)))).collect()
    };
    let mut alike: Vec<(usize, &Sheet)> = sheets_of(assessment, file)
        .filter(|other| other.id != sheet.id && free(other))
        .map(|other| (shared(&lines, other).len(), other))
        .filter(|(count, _)| *count >= LEAST)
        .collect();
    alike.sort_by_key(|(count, other)| (std::cmp::Reverse(*count), other.id));
    let mut common = lines;
    let mut group = vec![sheet];
    for (_, other) in alike {
        let kept = shared(&common, other);
        if kept.len() >= LEAST {
            common = kept.into_iter().filter_map(|at| common.get(at).copied()).collect();
            group.push(other);
        }
    }
    if group.len() < 2 {
        return None;
    }
    group.sort_by_key(|sheet| sheet.id);
    let name = free_name(assessment);
    let first = group.first()?;
    let newline = if source.text.contains("\r\n") { "\r\n" } else { "\n" };
    let firsts = own_lines(assessment, source, first);
    let mut text = format!("family {name}{newline}");
    for line in firsts.iter().filter(|line| common.iter().any(|c| c.says(line))) {
        text.push_str(&format!("    {}{newline}", line.text.trim()));
    }
    text.push_str(newline);
    let start = above_comments(source, assessment.span(first.heading).start)?;
    let place = |span: Span| assessment.sources.place(file, span);
    let mut edits = vec![edit(place(Span::new(start, start))?, text)];
    for sheet in &group {
        edits.push(edit(sheet.heading.end(), format!(" like {name}")));
        for line in own_lines(assessment, source, sheet).iter().filter(|line| common.iter().any(|c| c.says(line))) {
            edits.push(edit(place(line.whole)?, String::new()));
        }
    }
    let names: Vec<&str> = group.iter().map(|sheet| sheet.name.as_str()).collect();
    let names = if names.len() > 3 { format!("{} breakers", names.len()) } else { names.join(", ") };
    Some((format!("move {} particulars of {names} to a family", common.len()), edits))
}

fn edit(place: Place, text: String) -> Edit {
    Edit { title: String::new(), place, text }
}

/// A line of a breaker.
#[derive(Clone, Copy)]
struct Said<'a> {
    statement: &'a Statement,
    value: &'a str,
    /// What follows the value: a comment.
    rest: &'a str,
    text: &'a str,
    /// The line with its ending.
    whole: Span,
}

impl Said<'_> {
    /// Whether another line says the same; a comment is the same or there is none.
    fn says(&self, other: &Said<'_>) -> bool {
        self.statement.particular.is(other.statement.particular)
            && self.statement.about == other.statement.about
            && self.statement.limit == other.statement.limit
            && self.value == other.value
            && self.rest == other.rest
    }
}

/// The lines of a breaker that a family can hold. What is said twice stays where it is: the order of the two matters.
fn own_lines<'a>(assessment: &Assessment, source: &'a SourceFile, sheet: &'a Sheet) -> Vec<Said<'a>> {
    let twice = |statement: &Statement| {
        let same =
            |other: &&Arc<Statement>| other.particular.is(statement.particular) && other.about == statement.about;
        sheet.statements.iter().filter(same).count() > 1
    };
    sheet
        .statements
        .iter()
        .filter(|statement| {
            statement.label.block() == sheet.heading.block()
                && !statement.value.is_empty()
                && particular_of(SheetKind::Family, statement.particular.label).is_some()
                && !twice(statement)
        })
        .filter_map(|statement| {
            let line = line_at(source, assessment.span(statement.label).start)?;
            let value = assessment.span(statement.value);
            let next = source.line_starts().partition_point(|start| *start <= line.start);
            let end = source.line_starts().get(next).copied().unwrap_or(source.text.len() as u32);
            Some(Said {
                statement,
                value: value.of(&source.text),
                rest: Span::new(value.end, line.start + line.len).of(&source.text).trim(),
                text: text_of(source, line),
                whole: Span::new(line.start, end),
            })
        })
        .collect()
}

fn free_name(assessment: &Assessment) -> String {
    let taken = |name: &str| assessment.set.sheets().any(|sheet| sheet.name == name);
    let mut name = "Common".to_owned();
    let mut number = 2;
    while taken(&name) {
        name = format!("Common{number}");
        number += 1;
    }
    name
}

/// The start of the line of a heading, or of the comments right above it.
fn above_comments(source: &SourceFile, offset: u32) -> Option<u32> {
    let lines: Vec<_> = source.lines().take_while(|line| line.start <= offset).collect();
    let (own, above) = lines.split_last()?;
    let is_comment = |line: &&LineAt<'_>| *line.kind == LineKind::Blank && !text_of(source, **line).trim().is_empty();
    Some(above.iter().rev().take_while(is_comment).last().unwrap_or(own).start)
}

/// The family that the breaker at `file` and sheet may be given.
pub fn offered(assessment: &Assessment, file: FileId, sheet: &Sheet, offset: u32) -> Option<(String, Vec<Edit>)> {
    // On the heading only: everywhere else it would be noise.
    (sheet.file() == file && assessment.span(sheet.heading).touches(offset))
        .then(|| extracted(assessment, sheet))
        .flatten()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::actions::applied;
    use crate::features::testing::assessed;

    const TWO: &str = "cbspec 1\nsystem S\n    highest voltage: 145 kV\n    frequency: 50 Hz\n\n# the first\nbreaker A on S\n    \
                       quantity: 2\n    rated voltage: 145 kV # as all\n    Isc: 31.5 kA\n    making current: from duty\n    \
                       opening time: 30 ms\n\nbreaker B on S\n    rated voltage: 145 kV # as all\n    opening time: 40 ms\n    \
                       rated short-circuit breaking current:  31.5 kA\n    making current: from duty";

    /// What each breaker says, wherever it stands.
    fn facts(assessment: &Assessment) -> Vec<(String, Vec<String>)> {
        assessment
            .set
            .of_kind(SheetKind::Breaker)
            .map(|sheet| {
                let mut all: Vec<String> = assessment
                    .set
                    .facts(sheet.id)
                    .statements()
                    .iter()
                    .map(|s| {
                        format!(
                            "{} {:?} {:?} {}",
                            s.particular.label,
                            s.about,
                            s.limit,
                            assessment.sources.text(s.value)
                        )
                    })
                    .collect();
                all.sort();
                (sheet.name.clone(), all)
            })
            .collect()
    }

    fn offered_in(text: &str, title: &str) -> Option<(String, Vec<Edit>)> {
        let assessment = assessed(text);
        let sheet = assessment.set.sheets().find(|sheet| sheet.title() == title).expect("a sheet");
        offered(&assessment, FileId(0), sheet, assessment.span(sheet.heading).start)
    }

    #[test]
    fn each_breaker_says_the_same_after() {
        for newline in ["\n", "\r\n"] {
            let text = TWO.replace('\n', newline);
            let (title, edits) = offered_in(&text, "breaker B").expect("offered");
            assert_eq!(title, "move 3 particulars of A, B to a family");
            let after = applied(&assessed(&text), &text, &edits);
            let (before, now) = (assessed(&text), assessed(&after));
            assert_eq!(facts(&before), facts(&now), "{after}");
            assert!(
                after.contains(&format!("family Common{newline}    rated voltage: 145 kV # as all{newline}")),
                "{after}"
            );
            assert!(after.contains("breaker A on S like Common") && after.contains("# the first"), "{after}");
            let rules = |assessment: &Assessment| {
                let mut all: Vec<_> = assessment.findings().iter().map(|f| (f.rule, f.message.clone())).collect();
                all.sort();
                all
            };
            assert_eq!(rules(&before), rules(&now));
            assert_eq!(after.contains("\r\n"), newline == "\r\n");
        }
    }

    #[test]
    fn not_for_less_than_three_nor_for_one_that_is_like_another() {
        assert!(offered_in(&TWO.replacen("Isc: 31.5 kA", "Isc: 40 kA", 1), "breaker A").is_none());
        let like = TWO.replace("breaker B on S", "breaker B on S like A");
        assert!(offered_in(&like, "breaker B").is_none() && offered_in(&like, "breaker A").is_none());
        assert!(offered_in(TWO, "system S").is_none());
    }
}
