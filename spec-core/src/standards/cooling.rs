//! How much continuous current thin air leaves (IEEE C37.20.2, C37.100).

use std::sync::LazyLock;

use serde::Deserialize;

use super::table;
use crate::quantity::{Length, Physical};

#[derive(Clone, Debug, Deserialize)]
pub(super) struct Row {
    altitude_m: f64,
    factor: f64,
}

static ROWS: LazyLock<Vec<Row>> = LazyLock::new(|| table::rows(include_str!("../../data/altitude_cooling.csv")));

#[cfg(test)]
pub(super) fn all() -> &'static [Row] {
    &ROWS
}

/// The share of the continuous current at an altitude, linear between the rows; none above the last, since nothing is extrapolated.
pub fn altitude_cooling(altitude: Length) -> Option<f64> {
    let metres = altitude.si();
    if ROWS.first().is_some_and(|row| metres <= row.altitude_m) {
        return Some(1.0);
    }
    ROWS.iter().zip(ROWS.iter().skip(1)).find(|(_, upper)| metres <= upper.altitude_m).map(|(lower, upper)| {
        let share = (metres - lower.altitude_m) / (upper.altitude_m - lower.altitude_m);
        lower.factor + share * (upper.factor - lower.factor)
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn linear_between_rows_and_nothing_beyond() {
        let at = |metres: f64| altitude_cooling(Length::from_si(metres));
        assert_eq!(at(400.0), Some(1.0));
        assert!(at(2250.0).is_some_and(|factor| (factor - 0.975).abs() < 1e-9));
        assert_eq!(at(3500.0), None);
    }
}
