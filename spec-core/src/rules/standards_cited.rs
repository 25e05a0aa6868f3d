//! Rules on the standards that a text cites.

use std::sync::Arc;

use super::{Check, Policy, Rule, add_line};
use crate::finding::{FindingKind, Findings};
use crate::particular::{SheetKind, breaker, tender};
use crate::quantity::ElectricPotential;
use crate::sheet::{About, Facts, Item, Reading, Set, Sheet, Statement};
use crate::standards::{Citation, Regime, StandardScope, old_wordings, rating_structure, replacement_of};

/// The rules of this subject.
pub static ALL: &[&Rule] =
    &[&SUPERSEDED_STANDARD, &STANDARD_SCOPE, &MIXED_REGIMES, &UNDATED_STANDARD, &EDITION_VOCABULARY];

/// A list of standards with the sheet that it stands in.
struct Cited<'a> {
    sheet: &'a Sheet,
    statement: &'a Statement,
    items: &'a [Item],
}

/// The lists of standards of a sheet.
fn lists(sheet: &Sheet) -> impl Iterator<Item = Cited<'_>> {
    let particular = match sheet.kind {
        SheetKind::Tender => Some(&tender::STANDARDS),
        SheetKind::Breaker | SheetKind::Family => Some(&breaker::STANDARDS),
        _ => None,
    };
    let stated = move |statement: &&Arc<Statement>| particular.is_some_and(|particular| statement.states(particular));
    sheet.statements.iter().filter(stated).filter_map(move |statement| match &statement.reading {
        Reading::List(items) => Some(Cited { sheet, statement, items }),
        _ => None,
    })
}

/// The breakers for which a list holds: of a tender those without a list of their own, else those that state or take it over.
fn breakers_of<'a>(set: &'a Set, list: &Cited<'_>) -> Vec<&'a Facts> {
    if list.sheet.kind == SheetKind::Tender {
        let governed = |sheet: &&Sheet| {
            let tender = set.in_reach(sheet.file(), SheetKind::Tender).next();
            tender.is_some_and(|tender| tender.id == list.sheet.id)
        };
        let breakers = set.of_kind(SheetKind::Breaker).filter(governed).map(|sheet| set.facts(sheet.id));
        return breakers.filter(|facts| !facts.mentions(&breaker::STANDARDS)).collect();
    }
    let mut takers: Vec<&Sheet> = set.sheet(list.sheet.id).into_iter().collect();
    let mut at = 0;
    // Circles of `like` were cut when links were resolved.
    while let Some(sheet) = takers.get(at) {
        takers.extend(set.pointing_at(sheet.id, "like"));
        at += 1;
    }
    let breakers = takers.into_iter().filter(|sheet| sheet.kind == SheetKind::Breaker).map(|sheet| set.facts(sheet.id));
    let states =
        |facts: &&Facts| facts.statement(&breaker::STANDARDS).is_some_and(|own| own.value == list.statement.value);
    breakers.filter(states).collect()
}

/// No standard that is cited has been replaced.
pub static SUPERSEDED_STANDARD: Rule = Rule {
    name: "superseded-standard",
    title: "No standard that is cited has been replaced by another.",
    kind: FindingKind::Caution,
    basis: "lists of replaced standards (from memory); a public specification that cites old and new together",
    formula: "60056 -> 62271-100, 60694 -> 62271-1, 60427 -> 62271-101, 61233 -> 62271-110, 60298 -> 62271-200 ...",
    explanation: "Ratings, classes and tests of the old text differ, and reports are no longer written to it. Only standards under \
                  another number are told; an older edition may be meant. Write the replacement, or delete the line where that is \
                  cited already.",
    check: Check::Sheet(superseded),
};

fn superseded(_: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    for list in lists(sheet) {
        let cited: Vec<String> = list.items.iter().filter_map(|i| Citation::read(&i.text)).map(|c| c.number).collect();
        for item in list.items {
            let Some((replacement, since)) = Citation::read(&item.text).and_then(|c| replacement_of(&c.number)) else {
                continue;
            };
            let message = format!("{} was replaced by {replacement} in {since}", item.text);
            let finding = findings.add(&SUPERSEDED_STANDARD, item.place, message);
            finding.label("replaced").stated(item.text.as_str()).needed(replacement);
            let twice = Citation::read(replacement).is_some_and(|new| cited.contains(&new.number));
            if twice {
                finding.advice(format!("{replacement} is cited as well: delete {}", item.text));
            } else {
                finding.replace_by(replacement);
            }
        }
    }
}

/// The standard of a construction is for the rated voltage.
pub static STANDARD_SCOPE: Rule = Rule {
    name: "standard-scope",
    title: "A standard that is cited is for the rated voltage.",
    kind: FindingKind::Contradiction,
    basis: "scopes of IEC 62271-200, -201, -203, -205, -108, IEEE C37.20.2, C37.122 (from memory)",
    formula: "-200 up to 52 kV; -203, -205 and -108 above 52 kV",
    explanation: "A bidder cannot comply with a standard that does not apply. A list that holds for several breakers is right where \
                  it suits one of them, and where the rated voltage of one is not known.",
    check: Check::Sheet(scope),
};

fn scope(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    for list in lists(sheet) {
        let breakers = breakers_of(set, &list);
        for item in list.items {
            let Some(scope) = Citation::read(&item.text).and_then(|c| StandardScope::of(&c.number)) else { continue };
            let rated: Vec<_> =
                breakers.iter().map(|facts| facts.quantity::<ElectricPotential>(&breaker::RATED_VOLTAGE)).collect();
            let fits = rated.iter().any(|rated| rated.as_ref().is_none_or(|rated| scope.holds(rated.value)));
            let Some(Some(first)) = rated.first().filter(|_| !fits) else { continue };
            let message = format!(
                "{} is for {}, the rated voltage is {}: {}",
                item.text,
                scope.what(),
                first.measure,
                scope.instead()
            );
            findings
                .add(&STANDARD_SCOPE, item.place, message)
                .label("not for this voltage")
                .stated(item.text.as_str())
                .needed(scope.instead())
                .beside(first.statement, "the rated voltage")
                .advice(format!("cite {}", scope.instead()));
        }
    }
}

/// One rating structure governs.
pub static MIXED_REGIMES: Rule = Rule {
    name: "mixed-regimes",
    title: "The rating structures of IEC and IEEE are not mixed without saying which governs.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-1 and -100, IEEE C37.04 and C37.06 (from memory); public literature on their differences",
    formula: "rating standards of one family, or an order of precedence that names the family",
    explanation: "The same words mean different values in the two: insulation levels, capacitive currents, TRV, short-time duration. \
                  Guides do not count, and joint IEC/IEEE standards belong to both. Silent where the order of precedence names IEC \
                  or IEEE, and where every breaker has a list of its own. Say which governs, or mark each dual value.",
    check: Check::Sheet(mixed),
};

fn mixed(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    for list in lists(sheet) {
        let of = |regime: Regime| {
            list.items
                .iter()
                .find(|item| Citation::read(&item.text).and_then(|c| rating_structure(&c.number)) == Some(regime))
        };
        let (Some(iec), Some(ieee)) = (of(Regime::Iec), of(Regime::Ieee)) else { continue };
        let unused = breakers_of(set, &list).is_empty() && set.of_kind(SheetKind::Breaker).next().is_some();
        let tender = set.in_reach(list.sheet.file(), SheetKind::Tender).next().map(|sheet| set.facts(sheet.id));
        let decided = tender.is_some_and(|facts| {
            facts.list(&tender::ORDER_OF_PRECEDENCE).is_some_and(|(items, _)| {
                items.iter().any(|item| item.text.contains("IEC") || item.text.contains("IEEE"))
            })
        });
        if unused || decided {
            continue;
        }
        let (first, second) = if iec.place < ieee.place { (iec, ieee) } else { (ieee, iec) };
        let message = format!(
            "{} and {} both set ratings, and differ in insulation levels, capacitive currents and TRV",
            first.text, second.text
        );
        findings
            .add(&MIXED_REGIMES, second.place, message)
            .label("a second rating structure")
            .stated(second.text.as_str())
            .related(first.place, "the first")
            .advice(
                "name the family that governs in the order of precedence, or cite one of the two; mark each value that is given twice",
            );
    }
}

/// Whether a tender cites standards without an edition.
pub(super) fn cites_undated(facts: &Facts) -> bool {
    facts.list(&tender::STANDARDS).is_some_and(|(items, _)| items.iter().any(undated))
}

fn undated(item: &Item) -> bool {
    // One that was replaced has its own finding.
    Citation::read(&item.text).is_some_and(|cited| cited.year.is_none() && replacement_of(&cited.number).is_none())
}

/// Each standard has its edition.
pub static UNDATED_STANDARD: Rule = Rule {
    name: "undated-standard",
    title: "Each standard has its edition, or the tender the date at which editions hold.",
    kind: FindingKind::Remark,
    basis: "common practice, no source",
    formula: "a year at each standard, or a reference date of standards that is a date",
    explanation: "The edition may change between tender and test, and the latest edition is another one each year. Silent where the \
                  tender's reference date of standards is a date or the tender date. One finding for each list, and none for \
                  standards that were replaced.",
    check: Check::Sheet(editions),
};

fn editions(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    for list in lists(sheet) {
        let tender = set.in_reach(list.sheet.file(), SheetKind::Tender).next();
        let facts = tender.map(|sheet| set.facts(sheet.id));
        let without: Vec<&Item> = list.items.iter().filter(|item| undated(item)).collect();
        let Some(first) = without.first() else { continue };
        let day = facts.and_then(|facts| facts.word(&tender::REFERENCE_DATE_OF_STANDARDS));
        if let Some(("latest edition", reference)) = day {
            let message = format!("the latest edition of {} is another one when the breaker is tested", first.text);
            findings
                .add(&UNDATED_STANDARD, reference.value, message)
                .label("which day's latest?")
                .stated("latest edition")
                .needed("tender date")
                .related(first.place, "a standard without its edition")
                .replace_by("tender date");
            continue;
        }
        if facts.is_some_and(|facts| facts.mentions(&tender::REFERENCE_DATE_OF_STANDARDS)) {
            continue;
        }
        let others = if without.len() > 1 { format!(" and {} more", without.len() - 1) } else { String::new() };
        let message = format!("{}{others} without an edition: the text of which year holds?", first.text);
        let finding = findings.add(&UNDATED_STANDARD, first.place, message);
        finding.label("which edition?").stated(first.text.as_str());
        for other in without.iter().skip(1) {
            finding.related(other.place, "the same here");
        }
        match tender {
            Some(tender) => add_line(finding, tender, &tender::REFERENCE_DATE_OF_STANDARDS, "tender date"),
            None => {
                finding.advice("write the edition, such as IEC 62271-100:2021");
            }
        }
    }
}

/// The words are those of the edition that is cited.
pub static EDITION_VOCABULARY: Rule = Rule {
    name: "edition-vocabulary",
    title: "The words are those of the edition that is cited.",
    kind: FindingKind::Remark,
    basis: "IEC 62271-1:2017, IEC 62271-100:2008 with amendment 2 of 2017 (from memory)",
    formula: "rated normal current -> rated continuous current; rated TRV, rated break time, rated opening time: no ratings any more",
    explanation: "A heading of an older edition shows that the text was carried along; the value may be of it too. Harmless by itself. \
                  Silent where no edition with the new word is cited.",
    check: Check::Sheet(vocabulary),
};

fn vocabulary(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    if !matches!(sheet.kind, SheetKind::Breaker | SheetKind::Family) {
        return;
    }
    let tenders = set.in_reach(sheet.file(), SheetKind::Tender);
    let lists: Vec<_> = tenders.chain([sheet]).flat_map(lists).collect();
    for statement in sheet.statements.iter().filter(|s| s.about == About::Value) {
        let wording = statement.wording.to_lowercase();
        let Some(old) = old_wordings().find(|old| old.wording == wording) else { continue };
        let edition = lists.iter().flat_map(|list| list.items).find(|item| {
            Citation::read(&item.text).is_some_and(|cited| {
                rating_structure(&cited.number) == Some(old.regime) && cited.year.is_some_and(|year| year >= old.since)
            })
        });
        let Some(edition) = edition else { continue };
        let label = statement.particular.label;
        let message =
            format!("\"{}\" is of an older edition: {} says {}", statement.wording, edition.text, old.instead);
        findings
            .add(&EDITION_VOCABULARY, statement.label, message)
            .label("a word of an older edition")
            .stated(statement.wording.as_str())
            .needed(label)
            .related(edition.place, "the edition that is cited")
            .advice("harmless; look whether the value is of the older edition too")
            .replace_by(label);
    }
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    fn citing(list: &str) -> Bay {
        Bay::new().set("tender", "standards", list)
    }

    #[test]
    fn standards_that_were_replaced() {
        let finding = citing("IEC 62271-1:2017, IEC 60056").one("superseded-standard");
        assert_eq!((finding.kind, finding.edits[0].text.as_str()), (FindingKind::Caution, "IEC 62271-100"));
        let both = citing("IEC 62271-100:2021, IEC 60694, IEC 56").of("superseded-standard");
        assert_eq!(both.len(), 2);
        assert!(both.iter().any(|f| f.edits.is_empty() && f.message.contains("IEC 56 ")), "{both:#?}");
        citing("IEC 62271-100:2008").silent("superseded-standard");
    }

    #[test]
    fn standards_for_another_voltage() {
        let finding = citing("IEC 62271-100:2021, IEC 62271-200:2021").one("standard-scope");
        assert!(finding.message.contains("62271-203"), "{}", finding.message);
        citing("IEC 62271-203:2022").silent("standard-scope");
        citing("IEC 62271-200:2021").set("breaker", "rated voltage", "52 kV").silent("standard-scope");
        // Another breaker of the tender is what the standard is for.
        citing("IEC 62271-200:2021").and("breaker Low\n    rated voltage: 12 kV\n").silent("standard-scope");
        citing("IEC 62271-200:2021")
            .and("breaker Low\n    rated voltage: 12 kV\n    standards: IEC 62271-1:2017\n")
            .one("standard-scope");
    }

    #[test]
    fn two_rating_structures() {
        let bay = citing("IEC 62271-100:2021, IEEE C37.06:2009");
        assert_eq!(bay.one("mixed-regimes").kind, FindingKind::Caution);
        bay.clone().set("tender", "order of precedence", "\"IEC\", \"IEEE\"").silent("mixed-regimes");
        citing("IEC 62271-100:2021, IEEE C37.011:2019").silent("mixed-regimes");
        citing("IEC 62271-100:2021, IEC/IEEE 62271-37-013:2021").silent("mixed-regimes");
        bay.set("breaker", "standards", "IEC 62271-100:2021").silent("mixed-regimes");
    }

    #[test]
    fn editions_of_standards() {
        let bay = citing("IEC 62271-1:2017, IEC 62271-100");
        bay.silent("undated-standard");
        let open = bay.clone().without("tender", "reference date of standards");
        assert_eq!(open.one("undated-standard").edits[0].text, "\n    reference date of standards: tender date");
        open.silent("precedence-missing");
        let latest = bay.set("tender", "reference date of standards", "latest edition");
        assert_eq!(latest.one("undated-standard").edits[0].text, "tender date");
        citing("IEC 62271-1:2017, IEC 60056")
            .without("tender", "reference date of standards")
            .silent("undated-standard");
        Bay::new().set("tender", "reference date of standards", "latest edition").silent("undated-standard");
        Bay::new().without("tender", "reference date of standards").silent("undated-standard");
    }

    #[test]
    fn words_of_older_editions() {
        let bay =
            Bay::new().without("breaker", "rated continuous current").set("breaker", "rated normal current", "2500 A");
        let finding = bay.one("edition-vocabulary");
        assert_eq!((finding.kind, finding.edits[0].text.as_str()), (FindingKind::Remark, "rated continuous current"));
        bay.set("tender", "standards", "IEC 62271-1:2007, IEC 62271-100:2008").silent("edition-vocabulary");
        Bay::new().silent("edition-vocabulary");
    }
}
