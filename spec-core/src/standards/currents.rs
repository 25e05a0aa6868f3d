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
#[derive(Clone, Debug)]
pub struct PreferredCurrents {
    values: Vec<f64>,
}

impl PreferredCurrents {
    /// The series of a rating.
    pub fn of(rating: RatingSeries, regimes: &[Regime]) -> Self {
        let mut values: Vec<f64> = ROWS
            .iter()
            .filter(|row| row.rating == rating && regimes.contains(&row.regime))
            .map(|row| row.ampere)
            .collect();
        values.sort_by(f64::total_cmp);
        values.dedup_by(|a, b| same(*a, *b));
        Self { values }
    }

    /// Whether a current is on it.
    pub fn has(&self, current: ElectricCurrent) -> bool {
        self.values.iter().any(|value| same(*value, current.si()))
    }

    /// The lowest value that is not below `current`.
    pub fn at_or_above(&self, current: ElectricCurrent) -> Option<ElectricCurrent> {
        let found = self.values.iter().find(|value| **value >= current.si() || same(**value, current.si()));
        found.map(|value| ElectricCurrent::from_si(*value))
    }

    /// The next value above `current`.
    pub fn above(&self, current: ElectricCurrent) -> Option<ElectricCurrent> {
        let found = self.values.iter().find(|value| **value > current.si() && !same(**value, current.si()));
        found.map(|value| ElectricCurrent::from_si(*value))
    }

    /// How many steps of the series lie between two currents; negative where `to` is the lower.
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
