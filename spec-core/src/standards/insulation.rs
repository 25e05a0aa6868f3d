//! Rated insulation levels (IEC 62271-1 tables 1 to 4, IEEE C37.04).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{Regime, same, table};
use crate::quantity::{ElectricPotential, Physical};

/// A row of rated insulation levels.
#[derive(Clone, Debug, Deserialize)]
pub struct InsulationLevel {
    /// Whose table it is of.
    pub regime: Regime,
    ur_kv: f64,
    /// Indoor or outdoor, where the table tells them apart.
    pub location: String,
    ud_kv: f64,
    up_kv: f64,
    us_kv: Option<f64>,
    us_between_phases_kv: Option<f64>,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

static LEVELS: LazyLock<Vec<InsulationLevel>> =
    LazyLock::new(|| table::rows(include_str!("../../data/insulation_levels.csv")));

fn kv(number: f64) -> ElectricPotential {
    ElectricPotential::from_si(number * 1e3)
}

impl InsulationLevel {
    /// The rated voltage.
    pub fn rated_voltage(&self) -> ElectricPotential {
        kv(self.ur_kv)
    }

    /// The power-frequency level, rms.
    pub fn power_frequency(&self) -> ElectricPotential {
        kv(self.ud_kv)
    }

    /// The lightning impulse level, peak.
    pub fn lightning(&self) -> ElectricPotential {
        kv(self.up_kv)
    }

    /// The switching impulse level to earth, peak; from 300 kV up.
    pub fn switching(&self) -> Option<ElectricPotential> {
        self.us_kv.map(kv)
    }

    /// The switching impulse level between phases, peak.
    pub fn switching_between_phases(&self) -> Option<ElectricPotential> {
        self.us_between_phases_kv.map(kv)
    }

    /// Whether it is a row for this rated voltage.
    pub fn is_for(&self, rated: ElectricPotential) -> bool {
        same(self.ur_kv * 1e3, rated.si())
    }

    /// Whether it has this power-frequency and this lightning impulse level.
    pub fn is_pair(&self, ud: ElectricPotential, up: ElectricPotential) -> bool {
        same(self.ud_kv * 1e3, ud.si()) && same(self.up_kv * 1e3, up.si())
    }
}

/// All rows.
pub fn insulation_levels() -> &'static [InsulationLevel] {
    &LEVELS
}

#[cfg(test)]
mod tests {
    use super::*;

    /// IEC 62271-1 table 1 and IEEE C37.06 for 72.5 kV, as IEC 56:1987 prints both series (public digest).
    #[test]
    fn two_families_at_72_5_kv() {
        let rows: Vec<_> = insulation_levels().iter().filter(|row| row.is_for(kv(72.5))).collect();
        assert!(rows.iter().any(|row| row.regime == Regime::Iec && row.is_pair(kv(140.0), kv(325.0))));
        assert!(rows.iter().any(|row| row.regime == Regime::Ieee && row.is_pair(kv(160.0), kv(350.0))));
    }

    /// The rows of one rated voltage rise, and none stands twice.
    #[test]
    fn rows_of_one_voltage_are_in_order() {
        let levels = insulation_levels();
        for (at, row) in levels.iter().enumerate() {
            assert!(row.up_kv > row.ud_kv && row.us_kv.is_none_or(|us| us < row.up_kv), "{row:?}");
            let alike = |other: &&InsulationLevel| {
                other.regime == row.regime && other.location == row.location && other.is_for(row.rated_voltage())
            };
            let values = |row: &InsulationLevel| [row.ud_kv, row.up_kv, row.us_kv.unwrap_or_default()];
            for later in levels.iter().skip(at + 1).filter(alike) {
                assert!(values(row).iter().zip(values(later)).all(|(a, b)| *a <= b), "{row:?}, {later:?}");
                assert!(values(row) != values(later), "{row:?}");
            }
        }
    }

    #[test]
    fn switching_levels_from_300_kv() {
        for row in insulation_levels().iter().filter(|row| row.regime == Regime::Iec) {
            assert_eq!(row.switching().is_some(), row.ur_kv >= 300.0, "{}", row.ur_kv);
        }
    }
}
