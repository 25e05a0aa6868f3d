//! DC time constants of the rated short-circuit breaking current (IEC 62271-100 5.101).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{same, table};
use crate::quantity::{ElectricPotential, Physical, Time};

/// What a time constant is for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum TimeConstantCase {
    /// The standard value.
    Standard,
    /// A special case.
    Special,
    /// Generator circuit-breakers.
    Generator,
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct Row {
    tau_ms: f64,
    from_kv: f64,
    to_kv: f64,
    case: TimeConstantCase,
}

static ROWS: LazyLock<Vec<Row>> = LazyLock::new(|| table::rows(include_str!("../../data/time_constants.csv")));

#[cfg(test)]
pub(super) fn all() -> &'static [Row] {
    &ROWS
}

/// The listed time constants of a rated voltage.
#[derive(Clone, Debug)]
pub struct TimeConstants {
    listed: Vec<(f64, TimeConstantCase)>,
}

impl TimeConstants {
    /// Those of a rated voltage; with `generator`, those of a generator circuit-breaker too.
    pub fn of(rated: ElectricPotential, generator: bool) -> Self {
        let kv = rated.si() / 1e3;
        let mut listed: Vec<_> = ROWS
            .iter()
            .filter(|row| row.from_kv <= kv && kv <= row.to_kv)
            .filter(|row| generator || row.case != TimeConstantCase::Generator)
            .map(|row| (row.tau_ms * 1e-3, row.case))
            .collect();
        listed.sort_by(|a, b| a.0.total_cmp(&b.0));
        Self { listed }
    }

    /// The standard value.
    pub fn standard() -> Option<Time> {
        ROWS.iter().find(|row| row.case == TimeConstantCase::Standard).map(|row| Time::from_si(row.tau_ms * 1e-3))
    }

    /// What a time constant is listed for, if it is.
    pub fn case(&self, tau: Time) -> Option<TimeConstantCase> {
        self.listed.iter().find(|(listed, _)| same(*listed, tau.si())).map(|(_, case)| *case)
    }

    /// The least listed value that covers `tau`.
    pub fn at_or_above(&self, tau: Time) -> Option<Time> {
        self.listed
            .iter()
            .find(|(listed, _)| *listed >= tau.si() || same(*listed, tau.si()))
            .map(|(t, _)| Time::from_si(*t))
    }

    /// All of them, least first.
    pub fn values(&self) -> impl Iterator<Item = Time> {
        self.listed.iter().map(|(tau, _)| Time::from_si(*tau))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn listed(kv: f64, generator: bool) -> Vec<f64> {
        TimeConstants::of(ElectricPotential::from_si(kv * 1e3), generator)
            .values()
            .map(|t| (t.si() * 1e3).round())
            .collect()
    }

    /// IEC 62271-100:2001+A1:2002, 4.101.2 (public scan); 1100 kV and generators from memory.
    #[test]
    fn special_values_by_voltage() {
        assert_eq!(listed(24.0, false), [45.0, 120.0]);
        assert_eq!(listed(145.0, false), [45.0, 60.0]);
        assert_eq!(listed(550.0, false), [45.0, 75.0]);
        assert_eq!(listed(24.0, true), [45.0, 120.0, 133.0]);
    }

    #[test]
    fn the_least_that_covers() {
        let at = TimeConstants::of(ElectricPotential::from_si(145e3), false);
        assert_eq!(at.at_or_above(Time::from_si(0.045)).map(|t| t.si() * 1e3), Some(45.0));
        assert!(at.at_or_above(Time::from_si(0.0668)).is_none());
    }
}
