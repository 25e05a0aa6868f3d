//! Factors of the making and peak withstand currents (IEC 62271-100 5.103, IEC/IEEE 62271-37-013).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{same, table};
use crate::quantity::{Frequency, Physical};

/// Which factor is asked for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum MakingCase {
    /// The standard time constant.
    Standard,
    /// A special time constant.
    Special,
    /// A generator circuit-breaker.
    Generator,
}

#[derive(Clone, Debug, Deserialize)]
pub(super) struct Row {
    case: MakingCase,
    hz: f64,
    factor: f64,
}

static ROWS: LazyLock<Vec<Row>> = LazyLock::new(|| table::rows(include_str!("../../data/peak_factors.csv")));

#[cfg(test)]
pub(super) fn all() -> &'static [Row] {
    &ROWS
}

/// The factor between breaking and making current; none for a frequency that the table does not have.
pub fn making_factor(case: MakingCase, frequency: Frequency) -> Option<f64> {
    ROWS.iter().find(|row| row.case == case && same(row.hz, frequency.si())).map(|row| row.factor)
}
