//! The line side of short-line faults and the initial TRV (IEC 62271-100).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{same, table};
use crate::quantity::{ElectricCurrent, ElectricPotential, ElectricalResistance, Physical, Time};

/// A short-line fault duty.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
pub enum ShortLineDuty {
    /// 90 % of the rated breaking current.
    L90,
    /// 75 %.
    L75,
    /// 60 %.
    L60,
}

impl ShortLineDuty {
    /// All of them.
    pub const ALL: [Self; 3] = [Self::L90, Self::L75, Self::L60];

    /// As the trade calls it.
    pub const fn word(self) -> &'static str {
        match self {
            Self::L90 => "L90",
            Self::L75 => "L75",
            Self::L60 => "L60",
        }
    }
}

/// A row of the table of duties.
#[derive(Clone, Debug, Deserialize)]
pub struct ShortLineRow {
    duty: ShortLineDuty,
    /// Share of the rated breaking current.
    pub share: f64,
    from_kv: f64,
    above_ka: f64,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

/// Standard characteristics of the line of a short-line fault.
#[derive(Clone, Debug, Deserialize)]
pub struct LineSideRow {
    from_kv: f64,
    to_kv: f64,
    z_ohm: f64,
    /// The peak factor.
    pub k: f64,
    delay_us: f64,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

/// Standard characteristics of the initial TRV of a rated voltage.
#[derive(Clone, Debug, Deserialize)]
pub struct InitialTrvRow {
    ur_kv: f64,
    zb_ohm: f64,
    ti_us: f64,
    from_ka: f64,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

static DUTIES: LazyLock<Vec<ShortLineRow>> =
    LazyLock::new(|| table::rows(include_str!("../../data/short_line_duties.csv")));
static LINE_SIDES: LazyLock<Vec<LineSideRow>> = LazyLock::new(|| table::rows(include_str!("../../data/line_side.csv")));
static INITIAL: LazyLock<Vec<InitialTrvRow>> = LazyLock::new(|| table::rows(include_str!("../../data/itrv.csv")));

impl LineSideRow {
    /// The surge impedance.
    pub fn surge_impedance(&self) -> ElectricalResistance {
        ElectricalResistance::from_si(self.z_ohm)
    }

    /// The delay of the line side, tdL.
    pub fn delay(&self) -> Time {
        Time::from_si(self.delay_us * 1e-6)
    }
}

impl InitialTrvRow {
    /// Surge impedance of the busbar, Zb.
    pub fn surge_impedance(&self) -> ElectricalResistance {
        ElectricalResistance::from_si(self.zb_ohm)
    }

    /// Time to the first peak, ti.
    pub fn time(&self) -> Time {
        Time::from_si(self.ti_us * 1e-6)
    }
}

/// The row of a duty.
pub fn short_line_row(duty: ShortLineDuty) -> Option<&'static ShortLineRow> {
    DUTIES.iter().find(|row| row.duty == duty)
}

/// Whether a breaker of these ratings, with an overhead line directly at it, has short-line fault duties. IEC 62271-100 6.109.
pub fn short_line_faults_apply(rated: ElectricPotential, breaking: ElectricCurrent) -> bool {
    let at_least = |row: &ShortLineRow| rated.si() >= row.from_kv * 1e3 || same(rated.si(), row.from_kv * 1e3);
    let above = |row: &ShortLineRow| breaking.si() > row.above_ka * 1e3 && !same(breaking.si(), row.above_ka * 1e3);
    DUTIES.first().is_some_and(|row| at_least(row) && above(row))
}

/// The line of a rated voltage; none above the table.
pub fn line_side(rated: ElectricPotential) -> Option<&'static LineSideRow> {
    let kv = rated.si() / 1e3;
    LINE_SIDES.iter().find(|row| kv > row.from_kv && (kv < row.to_kv || same(kv, row.to_kv)))
}

/// The initial TRV of a rated voltage of the table; none for others and for a breaking current below the table's.
/// IEC 62271-100, initial TRV.
pub fn initial_trv_row(rated: ElectricPotential, breaking: ElectricCurrent) -> Option<&'static InitialTrvRow> {
    INITIAL.iter().find(|row| {
        let from = row.from_ka * 1e3;
        same(row.ur_kv * 1e3, rated.si()) && (breaking.si() >= from || same(breaking.si(), from))
    })
}

#[cfg(test)]
pub(super) fn lengths() -> [(&'static str, &'static str, usize); 3] {
    [
        ("short-line duties", include_str!("../../data/short_line_duties.csv"), DUTIES.len()),
        ("line sides", include_str!("../../data/line_side.csv"), LINE_SIDES.len()),
        ("initial TRV", include_str!("../../data/itrv.csv"), INITIAL.len()),
    ]
}

#[cfg(test)]
mod tests {
    use super::*;

    fn kv(n: f64) -> ElectricPotential {
        ElectricPotential::from_si(n * 1e3)
    }

    fn ka(n: f64) -> ElectricCurrent {
        ElectricCurrent::from_si(n * 1e3)
    }

    /// IEC 62271-100 6.109, from memory: from 15 kV up and above 12.5 kA; the initial TRV from 100 kV and 25 kA up.
    #[test]
    fn where_the_duties_apply() {
        assert!(short_line_faults_apply(kv(24.0), ka(25.0)));
        assert!(!short_line_faults_apply(kv(24.0), ka(12.5)));
        assert!(!short_line_faults_apply(kv(12.0), ka(25.0)));
        assert!(initial_trv_row(kv(145.0), ka(25.0)).is_some());
        assert!(initial_trv_row(kv(145.0), ka(20.0)).is_none());
        assert!(initial_trv_row(kv(72.5), ka(40.0)).is_none());
    }

    #[test]
    fn lines_by_voltage() {
        assert!((line_side(kv(170.0)).expect("a row").delay().si() - 0.2e-6).abs() < 1e-12);
        assert!((line_side(kv(245.0)).expect("a row").delay().si() - 0.5e-6).abs() < 1e-12);
        assert_eq!(line_side(kv(1100.0)).expect("a row").surge_impedance().si(), 330.0);
        assert!(line_side(kv(1500.0)).is_none());
    }
}
