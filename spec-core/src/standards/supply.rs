//! Auxiliary supply: preferred voltages, and the range in which coils work (IEC 62271-1 5.9, IEEE C37.06).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{Regime, same, table};
use crate::quantity::{ElectricPotential, Physical};

/// Direct or alternating.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum Supply {
    /// Direct.
    Dc,
    /// Alternating.
    Ac,
}

/// Which device a range is for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum Device {
    /// The closing release.
    Closing,
    /// The shunt opening release.
    Opening,
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct Voltage {
    supply: Supply,
    volts: f64,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
enum Unit {
    Share,
    Volt,
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct Row {
    regime: Regime,
    device: Device,
    supply: Supply,
    rated_v: Option<f64>,
    least: f64,
    greatest: f64,
    unit: Unit,
}

static VOLTAGES: LazyLock<Vec<Voltage>> = LazyLock::new(|| table::rows(include_str!("../../data/supply_voltages.csv")));
static RANGES: LazyLock<Vec<Row>> = LazyLock::new(|| table::rows(include_str!("../../data/coil_ranges.csv")));

#[cfg(test)]
pub(super) fn counts() -> (usize, usize) {
    (VOLTAGES.len(), RANGES.len())
}

/// The preferred supply voltages of one kind, in rising order.
pub fn supply_voltages(supply: Supply) -> impl Iterator<Item = ElectricPotential> {
    VOLTAGES.iter().filter(move |row| row.supply == supply).map(|row| ElectricPotential::from_si(row.volts))
}

/// Whether a direct supply voltage is a preferred one.
pub fn is_supply_voltage(supply: Supply, voltage: ElectricPotential) -> bool {
    supply_voltages(supply).any(|preferred| same(preferred.si(), voltage.si()))
}

/// The range in which a device of this rated voltage works by the standards cited: the wider one where both have one, and the
/// shares of the IEC where the IEEE has no row.
pub fn coil_range(
    device: Device,
    supply: Supply,
    rated: ElectricPotential,
    regimes: &[Regime],
) -> Option<(ElectricPotential, ElectricPotential)> {
    let of = |regime: Regime| {
        RANGES
            .iter()
            .filter(move |row| row.regime == regime && row.device == device && row.supply == supply)
            .filter(|row| row.rated_v.is_none_or(|volts| same(volts, rated.si())))
            .map(|row| match row.unit {
                Unit::Share => (row.least * rated.si(), row.greatest * rated.si()),
                Unit::Volt => (row.least, row.greatest),
            })
    };
    let mut all: Vec<(f64, f64)> = regimes.iter().flat_map(|regime| of(*regime)).collect();
    if all.is_empty() {
        all = of(Regime::Iec).collect();
    }
    let (least, greatest) = all.into_iter().reduce(|a, b| (a.0.min(b.0), a.1.max(b.1)))?;
    Some((ElectricPotential::from_si(least), ElectricPotential::from_si(greatest)))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn v(volts: f64) -> ElectricPotential {
        ElectricPotential::from_si(volts)
    }

    #[test]
    fn preferred_voltages() {
        assert!(is_supply_voltage(Supply::Dc, v(110.0)));
        assert!(!is_supply_voltage(Supply::Dc, v(115.0)));
    }

    #[test]
    fn ranges_follow_the_standards_cited() {
        let range = |device, rated, regimes: &[Regime]| {
            coil_range(device, Supply::Dc, v(rated), regimes).map(|(a, b)| (a.si().round(), b.si().round()))
        };
        assert_eq!(range(Device::Closing, 220.0, &[Regime::Iec]), Some((187.0, 242.0)));
        assert_eq!(range(Device::Opening, 220.0, &[Regime::Iec]), Some((154.0, 242.0)));
        assert_eq!(range(Device::Closing, 125.0, &[Regime::Ieee]), Some((90.0, 140.0)));
        assert_eq!(range(Device::Closing, 48.0, &[Regime::Ieee]), Some((41.0, 53.0)));
    }
}
