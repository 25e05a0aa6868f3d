//! Preferred currents and durations (IEC 62271-1 5.5 and 5.8, 62271-100 5.101 by the R10 series; IEEE C37.04).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{Regime, same, table};
use crate::quantity::{ElectricCurrent, ElectricPotential, Physical, Time};

/// Which rating a series is of.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum RatingSeries {
    /// Short-circuit breaking current.
    Breaking,
    /// Continuous current.
    Continuous,
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct Row {
    rating: RatingSeries,
    regime: Regime,
    ampere: f64,
    offered: Offered,
}

/// Whether breakers are made for a value of the series.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
enum Offered {
    Yes,
    No,
}

static ROWS: LazyLock<Vec<Row>> = LazyLock::new(|| table::rows(include_str!("../../data/preferred_currents.csv")));

#[derive(Clone, Debug, Deserialize)]
struct Duration {
    seconds: f64,
}

static DURATIONS: LazyLock<Vec<Duration>> = LazyLock::new(|| table::rows(include_str!("../../data/durations.csv")));

#[cfg(test)]
pub(super) fn all() -> &'static [Row] {
    &ROWS
}

/// The preferred currents of one rating, as the families cited have them.
///
/// The series holds more values than breakers are made for: all of them are preferred, and only those that are offered are chosen
/// and counted as steps.
#[derive(Clone, Debug)]
pub struct PreferredCurrents {
    values: Vec<f64>,
    not_offered: Vec<f64>,
}

impl PreferredCurrents {
    /// The series of a rating.
    pub fn of(rating: RatingSeries, regimes: &[Regime]) -> Self {
        let rows = |offered| {
            let mut values: Vec<f64> = ROWS
                .iter()
                .filter(|row| row.rating == rating && regimes.contains(&row.regime) && row.offered == offered)
                .map(|row| row.ampere)
                .collect();
            values.sort_by(f64::total_cmp);
            values.dedup_by(|a, b| same(*a, *b));
            values
        };
        Self { values: rows(Offered::Yes), not_offered: rows(Offered::No) }
    }

    /// Whether a current is on it, offered or not.
    pub fn has(&self, current: ElectricCurrent) -> bool {
        self.values.iter().chain(&self.not_offered).any(|value| same(*value, current.si()))
    }

    /// The lowest value offered that is not below `current`.
    pub fn at_or_above(&self, current: ElectricCurrent) -> Option<ElectricCurrent> {
        let found = self.values.iter().find(|value| **value >= current.si() || same(**value, current.si()));
        found.map(|value| ElectricCurrent::from_si(*value))
    }

    /// The next value offered above `current`.
    pub fn above(&self, current: ElectricCurrent) -> Option<ElectricCurrent> {
        let found = self.values.iter().find(|value| **value > current.si() && !same(**value, current.si()));
        found.map(|value| ElectricCurrent::from_si(*value))
    }

    /// How many steps between values offered lie between two currents; negative where `to` is the lower.
    pub fn steps(&self, from: ElectricCurrent, to: ElectricCurrent) -> i64 {
        let at = |v: f64| self.values.iter().filter(|value| **value < v && !same(**value, v)).count() as i64;
        at(to.si()) - at(from.si())
    }
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct Usual {
    to_kv: f64,
    ampere: f64,
}

static USUAL: LazyLock<Vec<Usual>> =
    LazyLock::new(|| table::rows(include_str!("../../data/usual_continuous_currents.csv")));

#[cfg(test)]
pub(super) fn usual() -> &'static [Usual] {
    &USUAL
}

/// The continuous current below which breakers of this rated voltage are hardly made, so that it is never more than needed.
pub fn usual_continuous_current(rated: ElectricPotential) -> Option<ElectricCurrent> {
    let kv = rated.si() / 1e3;
    USUAL.iter().find(|row| kv <= row.to_kv || same(kv, row.to_kv)).map(|row| ElectricCurrent::from_si(row.ampere))
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct Preferred {
    number: f64,
}

static NUMBERS: LazyLock<Vec<Preferred>> =
    LazyLock::new(|| table::rows(include_str!("../../data/preferred_numbers.csv")));

#[cfg(test)]
pub(super) fn preferred_numbers() -> usize {
    NUMBERS.len()
}

/// The least number of the R10 series that is not below `number`; none for what is not a positive number. ISO 3.
pub fn preferred_number(number: f64) -> Option<f64> {
    if !number.is_finite() || number <= 0.0 {
        return None;
    }
    let decade = 10f64.powf(number.log10().floor());
    let decades = [decade / 10.0, decade, decade * 10.0];
    let mut series = decades.into_iter().flat_map(|decade| NUMBERS.iter().map(move |row| row.number * decade));
    series.find(|value| *value >= number || same(*value, number))
}

/// The standard durations of short-circuit.
pub fn durations() -> impl Iterator<Item = Time> {
    DURATIONS.iter().map(|row| Time::from_si(row.seconds))
}

/// Whether a duration of short-circuit is a standard one.
pub fn is_duration(time: Time) -> bool {
    durations().any(|standard| same(standard.si(), time.si()))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ka(number: f64) -> ElectricCurrent {
        ElectricCurrent::from_si(number * 1e3)
    }

    #[test]
    fn the_r10_series() {
        let series = PreferredCurrents::of(RatingSeries::Breaking, &[Regime::Iec]);
        assert!(series.has(ka(31.5)));
        assert!(!series.has(ka(26.3)));
        assert_eq!(series.at_or_above(ka(33.0)), Some(ka(40.0)));
        assert_eq!(series.at_or_above(ka(31.5)), Some(ka(31.5)));
        assert_eq!(series.above(ka(31.5)), Some(ka(40.0)));
        assert_eq!(series.steps(ka(25.0), ka(63.0)), 4);
    }

    #[test]
    fn continuous_currents_differ_by_family() {
        let current = |a: f64| ElectricCurrent::from_si(a);
        assert!(PreferredCurrents::of(RatingSeries::Continuous, &[Regime::Ieee]).has(current(1200.0)));
        assert!(!PreferredCurrents::of(RatingSeries::Continuous, &[Regime::Iec]).has(current(1200.0)));
        assert!(PreferredCurrents::of(RatingSeries::Continuous, &[Regime::Iec]).has(current(3150.0)));
    }

    /// ISO 3: every current of the R10 series is preferred; 250, 315, 500 and 1000 A are hardly offered, so that none is chosen.
    #[test]
    fn preferred_and_not_chosen() {
        let current = |a: f64| ElectricCurrent::from_si(a);
        let series = PreferredCurrents::of(RatingSeries::Continuous, &[Regime::Iec]);
        for (rare, chosen) in [(250.0, 400.0), (315.0, 400.0), (500.0, 630.0), (1000.0, 1250.0)] {
            assert!(series.has(current(rare)));
            assert_eq!(series.at_or_above(current(rare)), Some(current(chosen)));
        }
        assert!(!series.has(current(1200.0)) && !series.has(current(300.0)));
        assert_eq!(series.steps(current(800.0), current(1250.0)), 1);
    }

    #[test]
    fn preferred_numbers_of_any_size() {
        for (number, preferred) in
            [(164.0, 200.0), (200.0, 200.0), (200.1, 250.0), (0.9, 1.0), (8.1e3, 10e3), (1.0, 1.0)]
        {
            let found = preferred_number(number).expect("a preferred number");
            assert!(same(found, preferred), "{number}: {found}");
        }
        assert_eq!(preferred_number(0.0), None);
    }

    #[test]
    fn rows_are_in_order() {
        for rating in [RatingSeries::Breaking, RatingSeries::Continuous] {
            for regime in [Regime::Iec, Regime::Ieee] {
                let rows: Vec<_> = ROWS.iter().filter(|row| (row.rating, row.regime) == (rating, regime)).collect();
                assert!(rows.len() > 3 && rows.is_sorted_by(|a, b| a.ampere < b.ampere), "{rating:?} {regime:?}");
            }
        }
    }

    #[test]
    fn standard_durations() {
        assert!(is_duration(Time::from_si(3.0)));
        assert!(!is_duration(Time::from_si(5.0)));
    }
}
