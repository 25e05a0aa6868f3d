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

#[cfg(test)]
mod tests {
    use super::*;

    /// 2.5 and 2.6 as in IEC 56:1987 4.103 (public digest); 2.7 and 2.74 from memory.
    #[test]
    fn factors_by_case_and_frequency() {
        let factor = |case, hz: f64| making_factor(case, Frequency::from_si(hz));
        assert_eq!(factor(MakingCase::Standard, 50.0), Some(2.5));
        assert_eq!(factor(MakingCase::Standard, 60.0), Some(2.6));
        assert_eq!(factor(MakingCase::Special, 50.0), Some(2.7));
        assert_eq!(factor(MakingCase::Generator, 60.0), Some(2.74));
        assert_eq!(factor(MakingCase::Standard, 16.7), None);
    }

    /// A rating is meant for a time constant of 45 ms: the factor lies within 2 % of the first peak, sqrt2 (1 + exp(-T/(2 tau))) (own
    /// calculation), and below it at 50 Hz.
    #[test]
    fn standard_factors_are_near_the_first_peak() {
        for hz in [50.0f64, 60.0] {
            let first_peak = 2f64.sqrt() * (1.0 + (-0.5 / (hz * 0.045)).exp());
            let factor = making_factor(MakingCase::Standard, Frequency::from_si(hz)).expect("a factor");
            assert!((factor / first_peak - 1.0).abs() < 0.02, "{hz}: {first_peak}");
        }
    }
}
