//! Standards as a text cites them: number and edition, what they are about, and what replaced them.

use std::sync::LazyLock;

use serde::Deserialize;

use super::{Regime, table};
use crate::quantity::{ElectricPotential, Physical};

/// A standard as it is cited.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Citation {
    /// Its number, in capitals: `62271-100`, `C37.06`.
    pub number: String,
    /// The year of its edition.
    pub year: Option<u16>,
}

/// Words before a number that are no part of it.
const BEFORE: [&str; 11] = ["IEC", "IEEE", "ANSI", "ISO", "EN", "BS", "DIN", "STD", "TR", "TS", "PAS"];

impl Citation {
    /// Reads `IEC 62271-100:2021`, `IEC/IEEE 62271-37-013:2021`, `ANSI C37.06-1987`, `IEEE Std C37.04`.
    pub fn read(text: &str) -> Option<Self> {
        let text = text.trim().to_ascii_uppercase().replace('/', " ");
        let rest = text.split_whitespace().skip_while(|word| BEFORE.contains(&word.trim_end_matches('.')));
        let words: Vec<&str> = rest.collect();
        let first = words.first()?;
        if !first.contains(|c: char| c.is_ascii_digit()) {
            return None;
        }
        let (number, year) = match first.split_once(':') {
            Some((number, year)) => (number, year_of(year)),
            None => {
                match first.rsplit_once('-').filter(|(number, year)| number.contains('.') && year_of(year).is_some()) {
                    Some((number, year)) => (number, year_of(year)),
                    None => (*first, None),
                }
            }
        };
        let year = year.or_else(|| words.iter().skip(1).find_map(|word| year_of(word.trim_matches(['(', ')', ',']))));
        Some(Self { number: number.trim_end_matches([',', '.']).to_owned(), year })
    }
}

/// The year that `text` begins with.
fn year_of(text: &str) -> Option<u16> {
    let digits: String = text.chars().take_while(char::is_ascii_digit).collect();
    digits.parse().ok().filter(|year| digits.len() == 4 && (1900..2100).contains(year))
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct ScopeRow {
    number: String,
    above_kv: f64,
    to_kv: f64,
    what: String,
    instead: String,
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct SupersededRow {
    number: String,
    replaced_by: String,
    since: u16,
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct VocabularyRow {
    regime: Regime,
    wording: String,
    instead: String,
    before: u16,
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct RatingRow {
    number: String,
    regime: Regime,
}

static RATINGS: LazyLock<Vec<RatingRow>> =
    LazyLock::new(|| table::rows(include_str!("../../data/rating_standards.csv")));
static SCOPES: LazyLock<Vec<ScopeRow>> = LazyLock::new(|| table::rows(include_str!("../../data/standard_scopes.csv")));
static SUPERSEDED: LazyLock<Vec<SupersededRow>> =
    LazyLock::new(|| table::rows(include_str!("../../data/superseded_standards.csv")));
static VOCABULARY: LazyLock<Vec<VocabularyRow>> =
    LazyLock::new(|| table::rows(include_str!("../../data/edition_vocabulary.csv")));

#[cfg(test)]
pub(super) fn counts() -> (usize, usize, usize, usize) {
    (SCOPES.len(), SUPERSEDED.len(), VOCABULARY.len(), RATINGS.len())
}

/// What a standard is for.
#[derive(Clone, Copy, Debug)]
pub struct StandardScope(&'static ScopeRow);

impl StandardScope {
    /// The scope of a standard, where it ends at a voltage.
    pub fn of(number: &str) -> Option<Self> {
        SCOPES.iter().find(|row| row.number == number).map(Self)
    }

    /// Whether it is for this rated voltage.
    pub fn holds(self, rated: ElectricPotential) -> bool {
        let kv = rated.si() / 1e3;
        kv > self.0.above_kv * (1.0 + 1e-4) && kv <= self.0.to_kv * (1.0 + 1e-4)
    }

    /// What it is for, in words.
    pub fn what(self) -> &'static str {
        &self.0.what
    }

    /// What is cited instead outside of it.
    pub fn instead(self) -> &'static str {
        &self.0.instead
    }
}

/// The standard that replaced this one, and since which year.
pub fn replacement_of(number: &str) -> Option<(&'static str, u16)> {
    SUPERSEDED.iter().find(|row| row.number == number).map(|row| (row.replaced_by.as_str(), row.since))
}

/// The family whose rating structure a standard holds; none for guides and for joint standards.
pub fn rating_structure(number: &str) -> Option<Regime> {
    RATINGS.iter().find(|row| row.number == number).map(|row| row.regime)
}

/// A wording that an edition replaced.
#[derive(Clone, Copy, Debug)]
pub struct OldWording {
    /// Whose standard.
    pub regime: Regime,
    /// The old wording, in small letters.
    pub wording: &'static str,
    /// What it is called since.
    pub instead: &'static str,
    /// The edition of this year has the new one.
    pub since: u16,
}

/// The wordings that editions replaced.
pub fn old_wordings() -> impl Iterator<Item = OldWording> {
    VOCABULARY.iter().map(|row| OldWording {
        regime: row.regime,
        wording: &row.wording,
        instead: &row.instead,
        since: row.before,
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn citations() {
        for (text, number, year) in [
            ("IEC 62271-100:2021", "62271-100", Some(2021)),
            ("IEC/IEEE 62271-37-013:2021", "62271-37-013", Some(2021)),
            ("ANSI C37.06-1987", "C37.06", Some(1987)),
            ("IEEE Std C37.04", "C37.04", None),
            ("IEC/TS 60815-2:2008", "60815-2", Some(2008)),
            ("IEC 60056", "60056", None),
            ("62271-100 (2008)", "62271-100", Some(2008)),
            ("IEC 62271-100:2008+A2:2017", "62271-100", Some(2008)),
        ] {
            let read = Citation::read(text).map(|c| (c.number, c.year));
            assert_eq!(read, Some((number.to_owned(), year)), "{text}");
        }
        assert_eq!(Citation::read("the standards in force"), None);
    }

    #[test]
    fn scopes_end_at_52_kv() {
        let kv = |number: f64| ElectricPotential::from_si(number * 1e3);
        let scope = StandardScope::of("62271-200").expect("a row");
        assert!(scope.holds(kv(52.0)) && !scope.holds(kv(72.5)));
        assert!(!StandardScope::of("62271-203").expect("a row").holds(kv(52.0)));
        assert!(StandardScope::of("62271-100").is_none());
    }
}
