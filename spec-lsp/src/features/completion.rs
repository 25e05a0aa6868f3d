//! Completion: headings, labels that the sheet does not have yet, words and units of values, names of sheets after links.

use firstpole_core::particular::{Kind, Particular, SheetKind, Target, WordList, declared, words};
use firstpole_core::rules;
use firstpole_core::sheet::Sheet;
use firstpole_core::source::SourceFile;
use firstpole_core::{Assessment, FileId, Span};

use super::actions::written as name_written;
use super::hover::{of_particular, written};
use super::spot::{line_at, particular_of, sheet_at, text_of};
use super::text::Text;

/// A proposal.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Proposal {
    /// As it is listed.
    pub label: String,
    /// What it is.
    pub kind: ProposalKind,
    /// A few words beside it.
    pub detail: String,
    /// What more there is to say about, once somebody asks.
    pub subject: Option<Subject>,
    /// What it puts in.
    pub insert: String,
    /// The same with places to fill in, where there are any: `${1:text}`.
    pub snippet: Option<String>,
    /// What it replaces.
    pub replaces: Span,
}

/// What a proposal is about. Its text is made when it is asked for: most proposals are never looked at.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Subject {
    /// A particular of a kind of sheet, by its label.
    Particular(SheetKind, &'static str),
    /// A rule.
    Rule(&'static str),
}

/// What there is to say about the particular `label` of a sheet, or about the rule `label` where there is no sheet.
pub fn documentation(sheet: Option<SheetKind>, label: &str) -> Option<Text> {
    if let Some(sheet) = sheet {
        return particular_of(sheet, label).map(of_particular);
    }
    let rule = rules::standard().into_iter().find(|rule| rule.name == label)?;
    Some(Text::new().sentence(rule.title).sentence(rule.explanation))
}

/// What a proposal is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ProposalKind {
    /// A heading.
    Heading,
    /// A label.
    Label,
    /// A value.
    Value,
    /// A unit.
    Unit,
    /// A word of the language.
    Keyword,
    /// The name of a sheet.
    Name,
    /// The name of a rule.
    Rule,
}

/// The proposals at an offset, the best first.
pub fn complete(assessment: &Assessment, file: FileId, offset: u32) -> Vec<Proposal> {
    let Some(source) = assessment.sources.file(file) else { return Vec::new() };
    let (start, whole) = match line_at(source, offset) {
        Some(line) if offset <= line.start + line.len => (line.start, text_of(source, line)),
        // The empty line after the last ending.
        _ => (offset, ""),
    };
    let before = whole.get(..(offset.saturating_sub(start)) as usize).unwrap_or("");
    let after = whole.get(before.len()..).unwrap_or("");
    let place = At { assessment, file, source, start, before, after };
    let mut quoted = false;
    let mut colon = None;
    for (at, c) in before.char_indices() {
        let blank_before = before.get(..at).is_none_or(|b| b.is_empty() || b.ends_with(char::is_whitespace));
        match c {
            '"' => quoted = !quoted,
            '#' if !quoted && blank_before => return Vec::new(),
            ':' if !quoted && colon.is_none() => colon = Some(at),
            _ => {}
        }
    }
    if quoted {
        return Vec::new();
    }
    match colon {
        Some(colon) => place.values(colon),
        None => place.line(),
    }
}

/// The place of a question.
struct At<'a> {
    assessment: &'a Assessment,
    file: FileId,
    source: &'a SourceFile,
    /// Where the line starts.
    start: u32,
    /// The line before the cursor.
    before: &'a str,
    /// The line after it.
    after: &'a str,
}

impl At<'_> {
    const fn offset(&self) -> u32 {
        self.start + self.before.len() as u32
    }

    /// From a byte of the line to the cursor.
    const fn from(&self, byte: usize) -> Span {
        Span::new(self.start + byte as u32, self.offset())
    }

    /// The sheet that the line stands in; a half-written heading is none.
    fn sheet(&self) -> Option<&Sheet> {
        let above = self.start.checked_sub(1).unwrap_or(self.start);
        sheet_at(self.assessment, self.file, above)
    }

    /// A line without a colon: a heading, or the beginning of a label.
    fn line(&self) -> Vec<Proposal> {
        let indent = self.before.len() - self.before.trim_start().len();
        let said = self.before.trim_start();
        if let Some((word, rest)) = said.split_once(char::is_whitespace)
            && let Some(kind) = SheetKind::read(word)
            // A label may begin with the word of a kind (`system earthing`); a heading has its name beside it.
            && !self.begins_label(said)
        {
            return self.heading(kind, rest);
        }
        let replaces = self.from(indent);
        let mut proposals = self.labels(replaces);
        if indent == 0 || proposals.is_empty() {
            let headings = headings(replaces);
            // At the margin a heading is more likely, below a heading a label.
            proposals = if indent == 0 {
                headings.into_iter().chain(proposals).collect()
            } else {
                proposals.into_iter().chain(headings).collect()
            };
        }
        if self
            .source
            .lines()
            .take_while(|line| line.start < self.start)
            .all(|line| line.start >= self.start || text_of(self.source, line).trim().is_empty())
        {
            proposals.insert(0, plain("cbspec 1", ProposalKind::Keyword, "the edition of the language", replaces));
        }
        proposals
    }

    fn begins_label(&self, said: &str) -> bool {
        let said = said.to_lowercase();
        said.split_whitespace().count() > 1
            && self.sheet().is_some_and(|sheet| declared(sheet.kind).iter().any(|p| p.label.starts_with(&said)))
    }

    fn heading(&self, kind: SheetKind, rest: &str) -> Vec<Proposal> {
        let words: Vec<&str> = rest.split_whitespace().collect();
        let partial = if rest.ends_with(char::is_whitespace) || rest.is_empty() {
            ""
        } else {
            words.last().copied().unwrap_or("")
        };
        let replaces = self.from(self.before.len() - partial.len());
        let settled = words.get(..words.len() - usize::from(!partial.is_empty())).unwrap_or(&[]);
        if let Some((_, target)) = settled.last().and_then(|last| kind.links().iter().find(|(word, _)| word == last)) {
            return self.targets(*target, replaces);
        }
        if settled.is_empty() && kind.named() {
            return Vec::new();
        }
        let left = kind.links().iter().filter(|(word, _)| !settled.contains(word));
        left.map(|(word, target)| {
            let mut proposal = plain(word, ProposalKind::Keyword, &points_at(*target), replaces);
            proposal.insert = format!("{word} ");
            proposal
        })
        .collect()
    }

    fn targets(&self, target: Target, replaces: Span) -> Vec<Proposal> {
        match target {
            Target::Sheet(kinds) => kinds
                .iter()
                .flat_map(|kind| self.assessment.set.in_reach(self.file, *kind))
                .filter_map(|sheet| {
                    let mut proposal = plain(&sheet.name, ProposalKind::Name, sheet.kind.word(), replaces);
                    proposal.insert = name_written(&sheet.name)?;
                    Some(proposal)
                })
                .collect(),
            Target::Rule => {
                let found = |name: &str| self.assessment.findings().iter().any(|finding| finding.rule == name);
                let mut all = rules::standard();
                all.sort_by_key(|rule| !found(rule.name));
                all.into_iter()
                    .map(|rule| Proposal {
                        subject: Some(Subject::Rule(rule.name)),
                        ..plain(rule.name, ProposalKind::Rule, rule.kind.word(), replaces)
                    })
                    .collect()
            }
        }
    }

    /// The labels that the sheet does not have yet: those that a finding asks for first, what is only carried last.
    fn labels(&self, replaces: Span) -> Vec<Proposal> {
        let Some(sheet) = self.sheet() else { return Vec::new() };
        let stated = self.assessment.set.resolved(sheet.id);
        let line = Span::new(self.start, self.offset() + self.after.len() as u32);
        let missing = |particular: &&&Particular| {
            !stated.iter().any(|statement| {
                let label = self.assessment.at(statement.label);
                let own_line = label.file == self.file && line.touches(label.span.start);
                statement.states(particular) && !own_line
            })
        };
        let asked: Vec<&str> = self
            .assessment
            .findings()
            .iter()
            .filter(|finding| self.assessment.at(finding.place).file == self.file)
            .flat_map(|finding| finding.edits.iter().map(|edit| edit.text.as_str()))
            .collect();
        let mut proposals: Vec<(u8, Proposal)> = declared(sheet.kind)
            .iter()
            .filter(missing)
            .map(|particular| {
                let is_asked = asked.iter().any(|text| text.contains(&format!("{}:", particular.label)));
                let rank = if is_asked { 0 } else { 1 + u8::from(particular.carried) };
                (rank, self.label(sheet, particular, replaces))
            })
            .collect();
        proposals.sort_by_key(|(rank, _)| *rank);
        proposals.into_iter().map(|(_, proposal)| proposal).collect()
    }

    fn label(&self, sheet: &Sheet, particular: &'static Particular, replaces: Span) -> Proposal {
        let insert = if self.after.contains(':') {
            particular.label.to_owned()
        } else {
            // In the column in which the values of the sheet stand.
            let column = sheet
                .statements
                .iter()
                .map(|statement| (statement.label.within(), statement.value.within()))
                .filter(|(label, value)| value.start > label.end)
                .map(|(label, value)| (value.start - label.start) as usize)
                .max()
                .unwrap_or(0);
            let width = column.max(particular.label.len() + 2);
            format!("{:<width$}", format!("{}:", particular.label))
        };
        let detail = match particular.symbols {
            [] => written(particular),
            symbols => format!("{}: {}", symbols.join(", "), written(particular)),
        };
        Proposal {
            subject: Some(Subject::Particular(sheet.kind, particular.label)),
            insert,
            ..plain(particular.label, ProposalKind::Label, &detail, replaces)
        }
    }

    /// After a label's colon.
    fn values(&self, colon: usize) -> Vec<Proposal> {
        let label = self.before.get(..colon).unwrap_or("").trim();
        let Some(particular) = self.sheet().and_then(|sheet| particular_of(sheet.kind, label)) else {
            return Vec::new();
        };
        let value = self.before.get(colon + 1..).unwrap_or("");
        let blank = value.len() - value.trim_start().len();
        let begin = colon + 1 + blank;
        let said = value.trim_start();
        let lead = if blank == 0 { " " } else { "" };
        let mut proposals = self.of_kind(particular, said, begin);
        let replaces = self.from(begin);
        if !said.contains(|c: char| c.is_ascii_digit()) {
            if particular.from_duty {
                proposals.insert(0, plain("from duty", ProposalKind::Keyword, "the checker chooses it", replaces));
            }
            let mut open = plain("open point", ProposalKind::Keyword, "left open, by whom and until when", replaces);
            open.snippet = Some("open point \"${1:who, until when}\"".to_owned());
            proposals.push(open);
        }
        if blank == 0 {
            for proposal in &mut proposals {
                proposal.insert.insert_str(0, lead);
                if let Some(snippet) = &mut proposal.snippet {
                    snippet.insert_str(0, lead);
                }
            }
        }
        proposals
    }

    fn of_kind(&self, particular: &Particular, said: &str, begin: usize) -> Vec<Proposal> {
        let whole = self.from(begin);
        // The last part of a list or of alternatives.
        let part = |separators: &[&str]| {
            let cut = separators.iter().filter_map(|s| said.rfind(s).map(|at| at + s.len())).max().unwrap_or(0);
            let rest = said.get(cut..).unwrap_or("");
            self.from(begin + cut + rest.len() - rest.trim_start().len())
        };
        match &particular.kind {
            Kind::Quantity(kind) => self.units(kind.units, particular, said),
            Kind::WordsOrQuantity(list, kind) => {
                let mut proposals = self.units(kind.units, particular, said);
                proposals.extend(of_list(list, whole));
                proposals
            }
            Kind::Words { list, alternatives } => of_list(list, if *alternatives { part(&[" or "]) } else { whole }),
            Kind::WordsOrText(list) | Kind::DateOrWords(list) => of_list(list, whole),
            Kind::WordSet(list) => of_list(list, part(&[","])),
            Kind::YesNo => ["yes", "no"].iter().map(|word| value_of(word, whole)).collect(),
            Kind::Classes => {
                let place = part(&[","]);
                CLASSES.iter().map(|class| value_of(class, place)).collect()
            }
            Kind::Sequence => SEQUENCES
                .iter()
                .map(|(text, snippet)| Proposal { snippet: Some((*snippet).to_owned()), ..value_of(text, whole) })
                .collect(),
            Kind::Gas => {
                let mut proposals = of_list(&words::GAS, part(&[" or ", "+", ","]));
                let mixture = Proposal {
                    snippet: Some("CO2 ${1:70} % + O2 ${2:30} %".to_owned()),
                    detail: "a mixture, in shares of moles".to_owned(),
                    ..value_of("CO2 70 % + O2 30 %", whole)
                };
                if said.is_empty() {
                    proposals.push(mixture);
                }
                proposals
            }
            Kind::Gases => of_list(&words::GAS, part(&[","])),
            Kind::Labels => {
                let place = part(&[","]);
                let all = [SheetKind::Breaker, SheetKind::System, SheetKind::Site];
                all.iter().flat_map(|kind| declared(*kind)).map(|p| value_of(p.label, place)).collect()
            }
            Kind::Ratio
            | Kind::Count
            | Kind::Year
            | Kind::Date
            | Kind::Text
            | Kind::Texts
            | Kind::Names
            | Kind::Standards
            | Kind::Expression
            | Kind::Outcome
            | Kind::AsLabel => Vec::new(),
        }
    }

    /// The units after a number.
    fn units(&self, units: &[&str], particular: &Particular, said: &str) -> Vec<Proposal> {
        let Some(last_digit) = said.rfind(|c: char| c.is_ascii_digit()) else { return Vec::new() };
        let rest = said.get(last_digit + 1..).unwrap_or("");
        let partial = rest.trim_start();
        // A second word after the unit is its qualifier, and not another unit.
        if partial.contains(char::is_whitespace) || rest.starts_with('.') {
            return Vec::new();
        }
        let replaces = self.from(self.before.len() - partial.len());
        let lead = if rest.is_empty() { " " } else { "" };
        let qualifiers: &[&str] = match &particular.kind {
            Kind::Quantity(kind) if kind.tail == firstpole_core::particular::Tail::PressureReference => {
                &[" abs", " gauge"]
            }
            _ => &[""],
        };
        units
            .iter()
            .flat_map(|unit| qualifiers.iter().map(move |word| format!("{unit}{word}")))
            .map(|unit| {
                let mut proposal = plain(&unit, ProposalKind::Unit, "unit", replaces);
                proposal.insert = format!("{lead}{unit}");
                proposal
            })
            .collect()
    }
}

const CLASSES: [&str; 8] = ["C1", "C2", "E1", "E2", "M1", "M2", "S1", "S2"];

const SEQUENCES: [(&str, &str); 3] = [
    ("O - 0.3 s - CO - 3 min - CO", "O - ${1:0.3 s} - CO - ${2:3 min} - CO"),
    ("O - 3 min - CO - 3 min - CO", "O - ${1:3 min} - CO - ${2:3 min} - CO"),
    ("CO - 15 s - CO", "CO - ${1:15 s} - CO"),
];

fn headings(replaces: Span) -> Vec<Proposal> {
    SheetKind::ALL
        .into_iter()
        .map(|kind| {
            let mut number = 0;
            let mut next = |what: &str| {
                number += 1;
                format!("${{{number}:{what}}}")
            };
            let mut snippet = kind.word().to_owned();
            if kind == SheetKind::Tender {
                snippet.push_str(&format!(" \"{}\"", next("Title")));
            } else if kind.named() {
                snippet.push_str(&format!(" {}", next("Name")));
            }
            // What a sheet is like is said by choice; the other links belong to it.
            for (word, target) in kind.links().iter().filter(|(word, _)| !matches!(*word, "like" | "through")) {
                if kind == SheetKind::Infeed && *word == "from" {
                    continue;
                }
                snippet.push_str(&format!(" {word} {}", next(&points_at(*target).replace(", ", "-or-"))));
            }
            let links: Vec<&str> = kind.links().iter().map(|(word, _)| *word).collect();
            let detail =
                if links.is_empty() { "heading".to_owned() } else { format!("heading, with {}", links.join(", ")) };
            let mut proposal = plain(kind.word(), ProposalKind::Heading, &detail, replaces);
            proposal.insert = format!("{} ", kind.word());
            proposal.snippet = Some(snippet);
            proposal
        })
        .collect()
}

fn points_at(target: Target) -> String {
    match target {
        Target::Sheet(kinds) => kinds.iter().map(|kind| kind.word()).collect::<Vec<_>>().join(", "),
        Target::Rule => "rule".to_owned(),
    }
}

fn of_list(list: &WordList, replaces: Span) -> Vec<Proposal> {
    list.all().map(|word| value_of(word, replaces)).collect()
}

fn value_of(text: &str, replaces: Span) -> Proposal {
    plain(text, ProposalKind::Value, "", replaces)
}

fn plain(text: &str, kind: ProposalKind, detail: &str, replaces: Span) -> Proposal {
    Proposal {
        label: text.to_owned(),
        kind,
        detail: detail.to_owned(),
        subject: None,
        insert: text.to_owned(),
        snippet: None,
        replaces,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, at_cursor, text_of};

    fn at(text: &str) -> Vec<Proposal> {
        let (assessment, at) = at_cursor(text);
        complete(&assessment, FileId(0), at)
    }

    fn labels(text: &str) -> Vec<String> {
        at(text).into_iter().map(|proposal| proposal.label).collect()
    }

    /// The text after the first proposal called `label` is taken.
    fn taken(text: &str, label: &str) -> String {
        let proposals = at(text);
        let proposal = proposals.iter().find(|p| p.label == label).unwrap_or_else(|| panic!("{label}: {proposals:?}"));
        let mut text = text.replacen('|', "", 1);
        text.replace_range(proposal.replaces.start as usize..proposal.replaces.end as usize, &proposal.insert);
        text
    }

    #[test]
    fn a_heading_at_the_margin() {
        let told = labels("cbspec 1\n|");
        assert_eq!(told.first().map(String::as_str), Some("tender"));
        assert!(told.contains(&"breaker".to_owned()));
        assert_eq!(labels("|").first().map(String::as_str), Some("cbspec 1"));
        let proposals = at("cbspec 1\nbre|");
        let breaker = proposals.iter().find(|p| p.label == "breaker").expect("breaker");
        assert_eq!(breaker.snippet.as_deref(), Some("breaker ${1:Name} on ${2:system} at ${3:site}"));
    }

    #[test]
    fn only_labels_that_are_missing() {
        let told = labels(&BAY.replace("    making current:     from duty\n", "    |\n"));
        assert!(
            told.contains(&"opening time".to_owned())
                && told.contains(&"rated short-circuit making current".to_owned())
        );
        assert!(!told.contains(&"rated voltage".to_owned()), "stated already");
        assert!(!told.contains(&"system".to_owned()), "no heading under a sheet");
    }

    #[test]
    fn a_label_that_is_begun_is_replaced_and_lands_in_its_column() {
        let text = "cbspec 1\nbreaker A\n    rated voltage:            145 kV\n    opening ti|\n";
        let after = taken(text, "opening time");
        assert!(after.ends_with("\n    opening time:             \n"), "{after}");
        let after = taken("cbspec 1\nbreaker A\n    opening| : 30 ms\n", "opening time");
        assert!(after.ends_with("\n    opening time : 30 ms\n"), "{after}");
    }

    #[test]
    fn words_of_the_list_of_a_value() {
        assert!(labels("cbspec 1\nsystem S\n    neutral: |").contains(&"resonant earthed".to_owned()));
        let after = taken("cbspec 1\nbreaker A\n    construction: live tank or dea|\n", "dead tank");
        assert!(after.ends_with("live tank or dead tank\n"), "{after}");
        let after = taken("cbspec 1\nsystem S\n    neutral:|\n", "isolated");
        assert!(after.ends_with("neutral: isolated\n"), "{after}");
    }

    #[test]
    fn units_after_a_number() {
        let text = "cbspec 1\nbreaker A\n    rated filling pressure: 0.7|\n";
        assert!(taken(text, "MPa abs").ends_with("0.7 MPa abs\n"));
        let after = taken("cbspec 1\nbreaker A\n    opening time: at most 30 m|\n", "ms");
        assert!(after.ends_with("30 ms\n"), "{after}");
        assert!(labels("cbspec 1\nbreaker A\n    rated voltage: 145 kV |\n").is_empty());
    }

    #[test]
    fn what_the_duty_can_choose() {
        let told = labels("cbspec 1\nbreaker A\n    making current: |\n");
        assert_eq!(told.first().map(String::as_str), Some("from duty"));
        assert_eq!(told.last().map(String::as_str), Some("open point"));
        assert!(!labels("cbspec 1\nbreaker A\n    opening time: |\n").contains(&"from duty".to_owned()));
    }

    #[test]
    fn classes_gases_and_sequences() {
        let after = taken("cbspec 1\nbreaker A\n    classes: C2, |\n", "M2");
        assert!(after.ends_with("C2, M2\n"), "{after}");
        assert!(labels("cbspec 1\nbreaker A\n    operating sequence: |\n").contains(&"CO - 15 s - CO".to_owned()));
        let after = taken("cbspec 1\nbreaker A\n    insulating gas: CO2 70 % + O|\n", "O2");
        assert!(after.ends_with("CO2 70 % + O2\n"), "{after}");
    }

    #[test]
    fn names_and_links_of_a_heading() {
        let file = BAY.to_owned();
        assert_eq!(labels(&(file.clone() + "breaker B on |")), ["Ring132"]);
        assert_eq!(labels(&(file.clone() + "breaker B on Ring132 |")), ["at", "like"]);
        assert_eq!(labels(&(file.clone() + "circuit C for Li|")), ["LineBay"]);
        let rules = labels(&(file.clone() + "deviation from |"));
        assert!(rules.len() > 50);
        let (assessment, _) = at_cursor("|");
        assert_eq!(text_of(&assessment, Span::new(0, 0)), "");
        assert!(labels(&(file + "breaker |")).is_empty(), "a name is the author's");
    }

    #[test]
    fn every_subject_has_a_text() {
        for text in [BAY.to_owned() + "    |", BAY.to_owned() + "deviation from |"] {
            for proposal in at(&text) {
                let text = match proposal.subject {
                    Some(Subject::Particular(sheet, label)) => documentation(Some(sheet), label),
                    Some(Subject::Rule(name)) => documentation(None, name),
                    None => continue,
                };
                assert!(text.is_some_and(|text| !text.plain().is_empty()), "{}", proposal.label);
            }
        }
        assert!(documentation(None, "no such rule").is_none());
    }

    #[test]
    fn nothing_in_comments_and_texts() {
        assert!(at("cbspec 1\n# a |\n").is_empty());
        assert!(at("cbspec 1\nsystem S\n    neutral: isolated # a|\n").is_empty());
        assert!(at("cbspec 1\ntender \"a|\"\n").is_empty());
        assert!(at("cbspec 1\nbreaker A\n    nothing such: |\n").is_empty());
    }
}
