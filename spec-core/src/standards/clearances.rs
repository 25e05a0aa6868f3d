//! Least clearances in air by the withstand voltage (IEC 60071-2).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{WithstandVoltage, table};
use crate::quantity::{ElectricPotential, Length, Physical};

#[derive(Clone, Debug, Deserialize)]
pub(super) struct Row {
    withstand: WithstandVoltage,
    level_kv: f64,
    clearance_mm: f64,
}

static ROWS: LazyLock<Vec<Row>> = LazyLock::new(|| table::rows(include_str!("../../data/clearances.csv")));

#[cfg(test)]
pub(super) fn all() -> &'static [Row] {
    &ROWS
}

/// The least clearance that is presumed to hold a withstand level without a test, linear between the rows; none outside of the
/// table, since nothing is extrapolated. IEC 60071-2 annex A.
pub fn clearance(withstand: WithstandVoltage, level: ElectricPotential) -> Option<Length> {
    let kv = level.si() / 1e3;
    let rows: Vec<&Row> = ROWS.iter().filter(|row| row.withstand == withstand).collect();
    let mm = rows
        .iter()
        .zip(rows.iter().skip(1))
        .find(|(lower, upper)| (lower.level_kv..=upper.level_kv).contains(&kv))
        .map(|(lower, upper)| {
            let share = (kv - lower.level_kv) / (upper.level_kv - lower.level_kv);
            lower.clearance_mm + share * (upper.clearance_mm - lower.clearance_mm)
        })?;
    Some(Length::from_si(mm / 1e3))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// IEC 60071-2 table A.1, from memory: 650 kV need 1300 mm, 1300 kV 2600 mm: from 380 kV up 500 kV over a metre.
    #[test]
    fn clearances_by_level() {
        let mm = |kv: f64| {
            let found = clearance(WithstandVoltage::LightningImpulse, ElectricPotential::from_si(kv * 1e3));
            found.map(|length| (length.si() * 1e3).round())
        };
        assert_eq!(mm(650.0), Some(1300.0));
        assert_eq!(mm(1300.0), Some(2600.0));
        assert_eq!(mm(900.0), Some(1800.0));
        assert_eq!(mm(5.0), None);
        assert_eq!(mm(2500.0), None);
    }

    #[test]
    fn rows_rise() {
        for withstand in [
            WithstandVoltage::LightningImpulse,
            WithstandVoltage::SwitchingToEarth,
            WithstandVoltage::SwitchingBetweenPhases,
        ] {
            let rows: Vec<_> = ROWS.iter().filter(|row| row.withstand == withstand).collect();
            assert!(rows.len() > 5, "{withstand:?}");
            assert!(
                rows.is_sorted_by(|a, b| a.level_kv < b.level_kv && a.clearance_mm <= b.clearance_mm),
                "{withstand:?}"
            );
        }
    }
}
