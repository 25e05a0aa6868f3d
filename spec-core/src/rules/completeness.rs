//! Rules on what a bidder or a check needs and the text does not say.
//!
//! What is missing of a system, a site or a tender is told once, however many breakers need it. A line that is there but open or
//! unreadable counts as stated here, since another rule speaks of it.

mod network;
mod ratings;
mod surroundings;

pub use network::{
    DC_TIME_CONSTANT_MISSING, DUTY_MISSING, FAULT_LEVEL_BASIS, NETWORK_KIND_MISSING, NEUTRAL_NOT_STATED,
    SINGLE_PHASE_LEVEL_MISSING,
};
pub use ratings::{CIRCUIT_MISSING, RATING_FOR_OBJECT_MISSING, RECLOSING_HALF_STATED, SUPPLY_RANGE_MISSING};
pub use surroundings::{PRECEDENCE_MISSING, QUANTITY_SUM, SITE_DATA_MISSING};

use super::{Check, Policy, Rule};
use crate::particular::{Particular, SheetKind};
use crate::sheet::{Facts, Set, Sheet, SheetId};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &DUTY_MISSING,
    &FAULT_LEVEL_BASIS,
    &DC_TIME_CONSTANT_MISSING,
    &SINGLE_PHASE_LEVEL_MISSING,
    &NEUTRAL_NOT_STATED,
    &NETWORK_KIND_MISSING,
    &SITE_DATA_MISSING,
    &CIRCUIT_MISSING,
    &RATING_FOR_OBJECT_MISSING,
    &RECLOSING_HALF_STATED,
    &SUPPLY_RANGE_MISSING,
    &PRECEDENCE_MISSING,
    &QUANTITY_SUM,
];

/// A breaker with what it states, taken over lines included.
struct Apparatus<'a> {
    sheet: &'a Sheet,
    facts: &'a Facts,
}

/// The breakers whose link `word` points at a sheet.
fn breakers_of<'a>(set: &'a Set, word: &'static str, id: SheetId) -> Vec<Apparatus<'a>> {
    set.pointing_at(id, word)
        .filter(|sheet| sheet.kind == SheetKind::Breaker)
        .map(|sheet| Apparatus { sheet, facts: set.facts(sheet.id) })
        .collect()
}

/// What the circuits of these breakers state.
fn circuits_of<'a>(set: &'a Set, breakers: &[Apparatus<'a>]) -> Vec<&'a Facts> {
    breakers
        .iter()
        .flat_map(|breaker| set.pointing_at(breaker.sheet.id, "for"))
        .filter(|sheet| sheet.kind == SheetKind::Circuit)
        .map(|circuit| set.facts(circuit.id))
        .collect()
}

/// The breakers that have no sheet of `kind` by the link `word` though none is in reach, file by file: where one is in reach, the
/// link itself is what is missing, and another rule says so.
fn breakers_without<'a>(set: &'a Set, word: &str, kind: SheetKind) -> Vec<Vec<&'a Sheet>> {
    let mut files: Vec<Vec<&Sheet>> = Vec::new();
    for breaker in set.of_kind(SheetKind::Breaker) {
        let linked = breaker.target(word).is_some() || breaker.links.iter().any(|(link, _)| link.word == word);
        if linked || set.in_reach(breaker.file(), kind).next().is_some() {
            continue;
        }
        let same_file = |group: &&mut Vec<&Sheet>| group.first().is_some_and(|first| first.file() == breaker.file());
        match files.iter_mut().find(same_file) {
            Some(group) => group.push(breaker),
            None => files.push(vec![breaker]),
        }
    }
    files
}

/// `breaker A`, or `breaker A and 2 more`.
fn first_and_more(breakers: &[&Sheet]) -> String {
    let Some((first, others)) = breakers.split_first() else { return String::new() };
    if others.is_empty() { first.title() } else { format!("{} and {} more", first.title(), others.len()) }
}

fn mentions_any(facts: &Facts, particulars: &[&Particular]) -> bool {
    particulars.iter().any(|particular| facts.mentions(particular))
}

/// `a`, `a and b`, `a, b and c`.
fn listed(items: &[&str], last: &str) -> String {
    match items {
        [] => String::new(),
        [only] => (*only).to_owned(),
        [most @ .., end] => format!("{} {last} {end}", most.join(", ")),
    }
}

/// `is` or `are`.
const fn be(count: usize) -> &'static str {
    if count == 1 { "is" } else { "are" }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::rules::testing::Bay;

    #[test]
    fn lists_read_as_sentences() {
        assert_eq!(listed(&["a"], "and"), "a");
        assert_eq!(listed(&["a", "b"], "or"), "a or b");
        assert_eq!(listed(&["a", "b", "c"], "and"), "a, b and c");
    }

    #[test]
    fn nothing_is_missing_in_the_clean_bay() {
        for rule in ALL {
            Bay::new().silent(rule.name);
        }
    }
}
