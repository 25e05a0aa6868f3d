//! Factors and steepness of the standard TRV envelopes by duty (IEC 62271-100).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{same, table};
use crate::quantity::{ElectricPotential, Physical, Time};

/// A terminal fault duty, or out of phase.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
pub enum Duty {
    /// 100 % of the rated breaking current.
    T100,
    /// 60 %.
    T60,
    /// 30 %.
    T30,
    /// 10 %.
    T10,
    /// Out of phase.
    #[serde(rename = "OP")]
    OutOfPhase,
}

impl Duty {
    /// All of them.
    pub const ALL: [Self; 5] = [Self::T100, Self::T60, Self::T30, Self::T10, Self::OutOfPhase];

    /// As the trade calls it.
    pub const fn word(self) -> &'static str {
        match self {
            Self::T100 => "T100",
            Self::T60 => "T60",
            Self::T30 => "T30",
            Self::T10 => "T10",
            Self::OutOfPhase => "OP",
        }
    }
}

/// The TRV system classes below 100 kV.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
pub enum SystemClass {
    /// Cable systems.
    S1,
    /// Line systems.
    S2,
}

/// Ranges of rated voltage with rules of their own.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
pub enum VoltageRange {
    /// Below 100 kV.
    #[serde(rename = "lt100")]
    Below100,
    /// 100 kV to 800 kV.
    #[serde(rename = "ge100")]
    From100,
    /// 1100 kV and above.
    #[serde(rename = "uhv")]
    Uhv,
}

impl VoltageRange {
    /// The range of a rated voltage.
    pub fn of(rated: ElectricPotential) -> Self {
        match rated.si() / 1e3 {
            kv if kv < 100.0 => Self::Below100,
            kv if kv < 1000.0 => Self::From100,
            _ => Self::Uhv,
        }
    }
}

/// A row of the table of duties.
#[derive(Clone, Debug, Deserialize)]
pub struct DutyRow {
    range: VoltageRange,
    class: Option<SystemClass>,
    duty: Duty,
    /// A first-pole-to-clear factor of the duty's own.
    pub own_kpp: Option<f64>,
    /// The amplitude factor.
    pub kaf: f64,
    /// The rate of rise, kV/us; absent where it follows from a time.
    pub rate_kv_per_us: Option<f64>,
    /// t2 as a multiple of t1; absent for two-parameter envelopes.
    pub t2_over_t1: Option<f64>,
    /// t1 as a multiple of that of T100.
    pub t1_over_t100: Option<f64>,
    /// t3 as a multiple of that of T100, below 100 kV.
    pub t3_over_t100: Option<f64>,
    /// The least time delay td, us; absent where it goes with t3.
    pub td_us: Option<f64>,
    /// The greatest td as a multiple of t1; absent where there is only one.
    pub td_most_over_t1: Option<f64>,
    /// td as a multiple of t3, of two-parameter envelopes.
    pub td_over_t3: Option<f64>,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

#[derive(Clone, Debug, Deserialize)]
struct S1Time {
    ur_kv: f64,
    t3_us: f64,
}

static ROWS: LazyLock<Vec<DutyRow>> = LazyLock::new(|| table::rows(include_str!("../../data/trv_duties.csv")));
static S1: LazyLock<Vec<S1Time>> = LazyLock::new(|| table::rows(include_str!("../../data/trv_s1_times.csv")));

#[cfg(test)]
pub(super) fn s1_times() -> usize {
    S1.len()
}

#[cfg(test)]
pub(super) fn all() -> &'static [DutyRow] {
    &ROWS
}

/// The row of a duty; below 100 kV that of a class.
pub fn duty_row(range: VoltageRange, class: Option<SystemClass>, duty: Duty) -> Option<&'static DutyRow> {
    let class = class.filter(|_| range == VoltageRange::Below100);
    ROWS.iter().find(|row| row.range == range && row.class == class && row.duty == duty)
}

/// t3 of T100 in class S1, for the rated voltages that the table has.
pub fn s1_time(rated: ElectricPotential) -> Option<Time> {
    S1.iter().find(|row| same(row.ur_kv * 1e3, rated.si())).map(|row| Time::from_si(row.t3_us * 1e-6))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Every duty has a row in every range and class, and each row has what its envelope is made of.
    #[test]
    fn no_duty_is_missing() {
        let ranges = [
            (VoltageRange::From100, None),
            (VoltageRange::Uhv, None),
            (VoltageRange::Below100, Some(SystemClass::S1)),
            (VoltageRange::Below100, Some(SystemClass::S2)),
        ];
        for (range, class) in ranges {
            for duty in Duty::ALL {
                let row = duty_row(range, class, duty).expect("a row");
                let two_parameters = row.t2_over_t1.is_none();
                assert_eq!(row.td_over_t3.is_some(), two_parameters, "{row:?}");
                assert_eq!(row.td_us.is_some(), !two_parameters, "{row:?}");
                assert_eq!(row.t3_over_t100.is_some(), range == VoltageRange::Below100, "{row:?}");
                assert!(
                    range == VoltageRange::Below100 || row.rate_kv_per_us.or(row.t1_over_t100).is_some(),
                    "{row:?}"
                );
            }
        }
        assert!(duty_row(VoltageRange::Below100, None, Duty::T100).is_none());
    }

    #[test]
    fn s1_times_rise_with_the_voltage() {
        assert!(S1.is_sorted_by(|a, b| a.ur_kv < b.ur_kv && a.t3_us < b.t3_us));
        assert_eq!(s1_time(ElectricPotential::from_si(38e3)), None);
    }

    #[test]
    fn ranges() {
        let of = |kv: f64| VoltageRange::of(ElectricPotential::from_si(kv * 1e3));
        assert_eq!(
            [72.5, 100.0, 800.0, 1100.0].map(of),
            [VoltageRange::Below100, VoltageRange::From100, VoltageRange::From100, VoltageRange::Uhv]
        );
    }
}
