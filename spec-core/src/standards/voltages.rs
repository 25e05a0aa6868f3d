//! Preferred rated voltages, and the nominal voltages that go with them (IEC 62271-1 5.2, IEC 60038, IEEE C37.04).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{Regime, same, table};
use crate::quantity::{ElectricPotential, Physical};

/// A rated voltage of the list.
#[derive(Clone, Debug, Deserialize)]
pub struct RatedVoltage {
    kv: f64,
    /// Whose list it is on.
    pub regime: Regime,
    /// The series of the list.
    pub series: String,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

#[derive(Clone, Debug, Deserialize)]
struct NominalVoltage {
    nominal_kv: f64,
    rated_kv: f64,
}

static RATED: LazyLock<Vec<RatedVoltage>> =
    LazyLock::new(|| table::rows(include_str!("../../data/rated_voltages.csv")));
static NOMINAL: LazyLock<Vec<NominalVoltage>> =
    LazyLock::new(|| table::rows(include_str!("../../data/nominal_voltages.csv")));

#[cfg(test)]
pub(super) fn nominal() -> usize {
    NOMINAL.len()
}

impl RatedVoltage {
    /// The voltage.
    pub fn voltage(&self) -> ElectricPotential {
        ElectricPotential::from_si(self.kv * 1e3)
    }
}

/// The whole list.
pub fn rated_voltages() -> &'static [RatedVoltage] {
    &RATED
}

fn list(regimes: &[Regime]) -> Vec<f64> {
    let mut all: Vec<f64> = RATED.iter().filter(|row| regimes.contains(&row.regime)).map(|row| row.kv * 1e3).collect();
    all.sort_by(f64::total_cmp);
    all.dedup_by(|a, b| same(*a, *b));
    all
}

/// Whether a voltage is on the list of one of these families.
pub fn is_rated_voltage(voltage: ElectricPotential, regimes: &[Regime]) -> bool {
    list(regimes).into_iter().any(|kv| same(kv, voltage.si()))
}

/// The lowest voltage of the list that is not below `voltage`.
pub fn rated_at_or_above(voltage: ElectricPotential, regimes: &[Regime]) -> Option<ElectricPotential> {
    list(regimes).into_iter().find(|v| *v >= voltage.si() || same(*v, voltage.si())).map(ElectricPotential::from_si)
}

/// How many steps of the list lie between two voltages; negative where `to` is the lower.
pub fn steps_between_voltages(from: ElectricPotential, to: ElectricPotential, regimes: &[Regime]) -> i64 {
    let at = |v: f64| list(regimes).into_iter().filter(|row| *row < v && !same(*row, v)).count() as i64;
    at(to.si()) - at(from.si())
}

/// The rated voltage that usually goes with a nominal voltage (110 kV: 123 kV), and is meant where somebody wrote the nominal one.
pub fn usual_rated(nominal: ElectricPotential) -> Option<ElectricPotential> {
    NOMINAL
        .iter()
        .find(|row| same(row.nominal_kv * 1e3, nominal.si()))
        .map(|row| ElectricPotential::from_si(row.rated_kv * 1e3))
}

#[cfg(test)]
mod tests {
    use super::*;

    const BOTH: [Regime; 2] = [Regime::Iec, Regime::Ieee];

    fn kv(number: f64) -> ElectricPotential {
        ElectricPotential::from_si(number * 1e3)
    }

    #[test]
    fn lists_of_both_families() {
        assert!(is_rated_voltage(kv(145.0), &[Regime::Iec]));
        assert!(is_rated_voltage(kv(38.0), &[Regime::Ieee]));
        assert!(!is_rated_voltage(kv(36.0), &[Regime::Ieee]));
        assert!(!is_rated_voltage(kv(110.0), &BOTH));
        assert_eq!(rated_at_or_above(kv(126.0), &[Regime::Iec]), Some(kv(145.0)));
        assert_eq!(rated_at_or_above(kv(145.0), &[Regime::Iec]), Some(kv(145.0)));
        assert_eq!(rated_at_or_above(kv(1300.0), &BOTH), None);
    }

    #[test]
    fn steps_count_along_the_list() {
        assert_eq!(steps_between_voltages(kv(145.0), kv(245.0), &[Regime::Iec]), 2);
        assert_eq!(steps_between_voltages(kv(145.0), kv(123.0), &[Regime::Iec]), -1);
        assert_eq!(steps_between_voltages(kv(145.0), kv(145.0), &[Regime::Iec]), 0);
    }

    /// A nominal voltage has one rated voltage, above it and on the list.
    #[test]
    fn nominal_voltages_lead_to_rated_ones() {
        for (at, row) in NOMINAL.iter().enumerate() {
            assert!(row.nominal_kv < row.rated_kv && is_rated_voltage(kv(row.rated_kv), &BOTH), "{row:?}");
            assert!(!NOMINAL.iter().skip(at + 1).any(|other| same(other.nominal_kv, row.nominal_kv)), "{row:?}");
        }
    }

    #[test]
    fn nominal_voltages_of_both_pairings() {
        for (nominal, rated) in
            [(110.0, 123.0), (115.0, 123.0), (132.0, 145.0), (138.0, 145.0), (400.0, 420.0), (69.0, 72.5)]
        {
            assert_eq!(usual_rated(kv(nominal)), Some(kv(rated)), "{nominal}");
        }
    }
}
