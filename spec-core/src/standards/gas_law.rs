//! The law on fluorinated gases in switchgear, as a table with the date on which it was made. No legal advice.

use std::sync::LazyLock;

use serde::Deserialize;

use super::table;
use crate::quantity::{ElectricCurrent, ElectricPotential, Physical};
use crate::sheet::Date;

/// From which day the law counts.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum CountsFrom {
    /// The day of putting into operation.
    Commissioning,
    /// The day on which the breaker becomes the buyer's.
    Acquisition,
}

/// Which gases a row forbids.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
pub enum ForbiddenGases {
    /// Any fluorinated gas.
    #[serde(rename = "any fluorinated")]
    Fluorinated,
    /// Fluorinated gases of a warming potential of 1 or more.
    #[serde(rename = "GWP at least 1")]
    Warming,
    /// SF6, pure or in a mixture.
    #[serde(rename = "SF6")]
    Sf6,
}

/// A row of the table.
#[derive(Clone, Debug, Deserialize)]
pub struct GasLaw {
    /// Whose law it is, in the word of the particular.
    pub jurisdiction: String,
    above_kv: f64,
    to_kv: f64,
    from_ka: f64,
    below_ka: Option<f64>,
    date: String,
    /// From which day it counts.
    pub counts_from: CountsFrom,
    /// What it forbids.
    pub gases: ForbiddenGases,
    /// The clause.
    pub clause: String,
    /// The day on which this row was written.
    pub as_of: String,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

#[derive(Clone, Debug, Deserialize)]
struct FluorinatedGas {
    gas: String,
    gwp_at_least_1: bool,
}

static LAW: LazyLock<Vec<GasLaw>> = LazyLock::new(|| table::rows(include_str!("../../data/gas_law.csv")));
static GASES: LazyLock<Vec<FluorinatedGas>> =
    LazyLock::new(|| table::rows(include_str!("../../data/fluorinated_gases.csv")));

impl GasLaw {
    /// The day from which the gas is forbidden.
    pub fn date(&self) -> Option<Date> {
        Date::read(&self.date)
    }

    /// Whether the row forbids a gas.
    pub fn forbids(&self, gas: &str) -> bool {
        let Some(row) = GASES.iter().find(|row| row.gas == gas) else { return false };
        match self.gases {
            ForbiddenGases::Fluorinated => true,
            ForbiddenGases::Warming => row.gwp_at_least_1,
            ForbiddenGases::Sf6 => gas == "SF6",
        }
    }
}

/// The row of a jurisdiction for a rated voltage and a breaking current.
pub fn gas_law(jurisdiction: &str, rated: ElectricPotential, breaking: ElectricCurrent) -> Option<&'static GasLaw> {
    let (kv, ka) = (rated.si() / 1e3, breaking.si() / 1e3);
    LAW.iter().find(|row| {
        row.jurisdiction == jurisdiction
            && kv > row.above_kv
            && kv <= row.to_kv
            && ka >= row.from_ka
            && row.below_ka.is_none_or(|below| ka < below)
    })
}

/// Whether a gas is fluorinated.
pub fn is_fluorinated(gas: &str) -> bool {
    GASES.iter().any(|row| row.gas == gas)
}

#[cfg(test)]
pub(super) fn all() -> &'static [GasLaw] {
    &LAW
}

#[cfg(test)]
mod tests {
    use super::*;

    fn date(jurisdiction: &str, kv: f64, ka: f64) -> String {
        let row = gas_law(jurisdiction, ElectricPotential::from_si(kv * 1e3), ElectricCurrent::from_si(ka * 1e3));
        row.and_then(GasLaw::date).expect("a row").to_string()
    }

    /// Regulation (EU) 2024/573 Art. 13(9), as a network operator quotes it; 72.5 kV with 63 kA falls under "or above 50 kA".
    #[test]
    fn classes_of_the_eu() {
        assert_eq!(date("EU", 24.0, 25.0), "2026-01-01");
        assert_eq!(date("EU", 36.0, 25.0), "2030-01-01");
        assert_eq!(date("EU", 145.0, 50.0), "2028-01-01");
        assert_eq!(date("EU", 72.5, 63.0), "2032-01-01");
        assert_eq!(date("EU", 245.0, 40.0), "2032-01-01");
    }

    /// 17 CCR 95352, tables 1 and 2.
    #[test]
    fn classes_of_california() {
        assert_eq!(date("California", 15.5, 25.0), "2025-01-01");
        assert_eq!(date("California", 38.0, 25.0), "2028-01-01");
        assert_eq!(date("California", 145.0, 40.0), "2025-01-01");
        assert_eq!(date("California", 145.0, 63.0), "2028-01-01");
        assert_eq!(date("California", 245.0, 50.0), "2027-01-01");
        assert_eq!(date("California", 550.0, 63.0), "2033-01-01");
    }

    #[test]
    fn what_a_row_forbids() {
        let row = |kv: f64| {
            gas_law("EU", ElectricPotential::from_si(kv * 1e3), ElectricCurrent::from_si(25e3)).expect("a row")
        };
        assert!(row(24.0).forbids("CF3I") && !row(145.0).forbids("CF3I"));
        assert!(row(145.0).forbids("C4F7N") && !row(24.0).forbids("CO2"));
        assert!(is_fluorinated("SF6") && !is_fluorinated("dry air"));
    }
}
