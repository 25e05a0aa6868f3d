//! Standard first-pole-to-clear and out-of-phase voltage factors (IEC 62271-100 5.102, 5.105).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{same, table};

#[derive(Clone, Debug, Deserialize)]
struct Row {
    factor: f64,
}

#[derive(Clone, Debug, Deserialize)]
struct OutOfPhaseRow {
    factor: f64,
    first_pole: f64,
}

static FIRST_POLE: LazyLock<Vec<Row>> =
    LazyLock::new(|| table::rows(include_str!("../../data/first_pole_factors.csv")));
static OUT_OF_PHASE: LazyLock<Vec<OutOfPhaseRow>> =
    LazyLock::new(|| table::rows(include_str!("../../data/out_of_phase.csv")));

/// The standard first-pole-to-clear factors, least first.
pub fn first_pole_factors() -> impl Iterator<Item = f64> {
    FIRST_POLE.iter().map(|row| row.factor)
}

/// The out-of-phase voltage factor by the earthing of the neutral.
pub fn out_of_phase_factor(effectively_earthed: bool) -> Option<f64> {
    let row = if effectively_earthed { OUT_OF_PHASE.first() } else { OUT_OF_PHASE.last() };
    row.map(|row| row.factor)
}

/// The first-pole-to-clear factor that an out-of-phase factor goes with in the tables of TRV; none for other factors.
pub fn out_of_phase_first_pole(out_of_phase: f64) -> Option<f64> {
    OUT_OF_PHASE.iter().find(|row| same(row.factor, out_of_phase)).map(|row| row.first_pole)
}

#[cfg(test)]
pub(super) fn lengths() -> [(&'static str, &'static str, usize); 2] {
    [
        ("first-pole factors", include_str!("../../data/first_pole_factors.csv"), FIRST_POLE.len()),
        ("out of phase", include_str!("../../data/out_of_phase.csv"), OUT_OF_PHASE.len()),
    ]
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The order of the rows is relied upon. IEC 56:1987 4.106 for out of phase (public digest).
    #[test]
    fn least_first() {
        assert_eq!(first_pole_factors().collect::<Vec<_>>(), [1.2, 1.3, 1.5]);
        assert_eq!(out_of_phase_factor(true), Some(2.0));
        assert_eq!(out_of_phase_factor(false), Some(2.5));
        assert_eq!([2.0, 2.5, 2.2].map(out_of_phase_first_pole), [Some(1.3), Some(1.5), None]);
    }
}
