//! Preferred ratings and voltage factors of capacitive current switching (IEC 62271-100).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{same, table};
use crate::quantity::{ElectricCurrent, ElectricPotential, Frequency, Physical};

/// Preferred rated capacitive currents of a rated voltage.
#[derive(Clone, Debug, Deserialize)]
pub struct CapacitiveRating {
    ur_kv: f64,
    line_a: Option<f64>,
    cable_a: Option<f64>,
    single_bank_a: f64,
    back_to_back_a: f64,
    inrush_ka: f64,
    inrush_hz: f64,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

impl CapacitiveRating {
    /// Rated line-charging breaking current; none below the voltages that have one.
    pub fn line(&self) -> Option<ElectricCurrent> {
        self.line_a.map(ElectricCurrent::from_si)
    }

    /// Rated cable-charging breaking current; none above the voltages that have one.
    pub fn cable(&self) -> Option<ElectricCurrent> {
        self.cable_a.map(ElectricCurrent::from_si)
    }

    /// Rated single capacitor bank breaking current.
    pub fn single_bank(&self) -> ElectricCurrent {
        ElectricCurrent::from_si(self.single_bank_a)
    }

    /// Rated back-to-back capacitor bank breaking current.
    pub fn back_to_back(&self) -> ElectricCurrent {
        ElectricCurrent::from_si(self.back_to_back_a)
    }

    /// Rated back-to-back inrush making current, peak.
    pub fn inrush_peak(&self) -> ElectricCurrent {
        ElectricCurrent::from_si(self.inrush_ka * 1e3)
    }

    /// Its frequency.
    pub fn inrush_frequency(&self) -> Frequency {
        Frequency::from_si(self.inrush_hz)
    }
}

/// What is switched.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum CapacitiveCircuit {
    /// An overhead line without load.
    #[serde(rename = "overhead line")]
    OverheadLine,
    /// A cable with a screen about each core.
    #[serde(rename = "screened cable")]
    ScreenedCable,
    /// A cable with one belt about its cores.
    #[serde(rename = "belted cable")]
    BeltedCable,
    /// A bank with its neutral earthed.
    #[serde(rename = "earthed bank")]
    EarthedBank,
    /// A bank with its neutral isolated.
    #[serde(rename = "isolated bank")]
    IsolatedBank,
    /// Every one of them, in the table.
    Any,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
enum Answer {
    Yes,
    No,
}

impl Answer {
    const fn of(yes: bool) -> Self {
        if yes { Self::Yes } else { Self::No }
    }
}

#[derive(Clone, Debug, Deserialize)]
struct VoltageFactorRow {
    circuit: CapacitiveCircuit,
    earthed: Answer,
    faulted: Answer,
    factor: f64,
}

/// A share by which a bank's current may exceed the calculated one.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum BankAllowance {
    /// For harmonics.
    Harmonics,
    /// For the tolerance of the capacitance.
    Tolerance,
}

#[derive(Clone, Debug, Deserialize)]
struct AllowanceRow {
    allowance: BankAllowance,
    factor: f64,
}

static RATINGS: LazyLock<Vec<CapacitiveRating>> =
    LazyLock::new(|| table::rows(include_str!("../../data/capacitive_ratings.csv")));
static FACTORS: LazyLock<Vec<VoltageFactorRow>> =
    LazyLock::new(|| table::rows(include_str!("../../data/capacitive_voltage_factors.csv")));
static ALLOWANCES: LazyLock<Vec<AllowanceRow>> =
    LazyLock::new(|| table::rows(include_str!("../../data/bank_allowances.csv")));

/// The preferred ratings of a rated voltage of the table.
pub fn capacitive_rating(rated: ElectricPotential) -> Option<&'static CapacitiveRating> {
    RATINGS.iter().find(|row| same(row.ur_kv * 1e3, rated.si()))
}

/// The capacitive voltage factor kc of a circuit: by whether the neutral of the system is effectively earthed, and whether it is
/// switched with an earth fault standing. IEC 62271-100, single-phase capacitive tests.
pub fn capacitive_voltage_factor(
    circuit: CapacitiveCircuit,
    effectively_earthed: bool,
    earth_fault: bool,
) -> Option<f64> {
    let (earthed, faulted) = (Answer::of(effectively_earthed), Answer::of(earth_fault));
    FACTORS
        .iter()
        .find(|row| {
            row.earthed == earthed
                && row.faulted == faulted
                && (row.circuit == circuit || row.circuit == CapacitiveCircuit::Any)
        })
        .map(|row| row.factor)
}

/// An allowance for the continuous current of a bank. IEC 60871-1.
pub fn bank_allowance(allowance: BankAllowance) -> Option<f64> {
    ALLOWANCES.iter().find(|row| row.allowance == allowance).map(|row| row.factor)
}

#[cfg(test)]
pub(super) fn lengths() -> [(&'static str, &'static str, usize); 3] {
    [
        ("capacitive ratings", include_str!("../../data/capacitive_ratings.csv"), RATINGS.len()),
        ("capacitive factors", include_str!("../../data/capacitive_voltage_factors.csv"), FACTORS.len()),
        ("bank allowances", include_str!("../../data/bank_allowances.csv"), ALLOWANCES.len()),
    ]
}

#[cfg(test)]
mod tests {
    use super::*;

    /// IEC 62271-100, from memory.
    #[test]
    fn factors_by_earthing() {
        use CapacitiveCircuit::{EarthedBank, IsolatedBank, OverheadLine, ScreenedCable};
        assert_eq!(capacitive_voltage_factor(ScreenedCable, true, false), Some(1.0));
        assert_eq!(capacitive_voltage_factor(OverheadLine, true, false), Some(1.2));
        assert_eq!(capacitive_voltage_factor(IsolatedBank, true, false), Some(1.4));
        assert_eq!(capacitive_voltage_factor(EarthedBank, false, false), Some(1.4));
        assert_eq!(capacitive_voltage_factor(OverheadLine, true, true), Some(1.4));
        assert_eq!(capacitive_voltage_factor(ScreenedCable, false, true), Some(1.7));
    }

    /// 500 A for line and cable at 550 kV (public digest of IEC 56:1987, printed for 525 kV).
    #[test]
    fn ratings() {
        let row = capacitive_rating(ElectricPotential::from_si(550e3)).expect("a row");
        assert_eq!(row.line(), Some(ElectricCurrent::from_si(500.0)));
        assert_eq!(row.cable(), row.line());
        assert!(capacitive_rating(ElectricPotential::from_si(30e3)).is_none());
    }
}
