//! Tables of the calculation of short-circuit currents (IEC 60909-0): voltage factors, decay, equivalent frequencies, resistances
//! of machines.

use std::sync::LazyLock;

use serde::Deserialize;

use super::{same, table};
use crate::quantity::{ElectricPotential, Physical, Power, Ratio, Time};

/// The voltage factors of a nominal voltage (IEC 60909-0, table 1).
#[derive(Clone, Debug, Deserialize)]
pub struct VoltageFactor {
    from_v: f64,
    to_v: f64,
    tolerance_percent: Option<f64>,
    /// For the greatest current.
    pub c_max: f64,
    /// For the least current.
    pub c_min: f64,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

/// A row of mu = a + b exp(-exponent IkG/IrG).
#[derive(Clone, Debug, Deserialize)]
pub(crate) struct SynchronousDecay {
    tmin_s: f64,
    pub(crate) a: f64,
    pub(crate) b: f64,
    pub(crate) exponent: f64,
}

/// A row of q = a + b ln(m).
#[derive(Clone, Debug, Deserialize)]
pub(crate) struct AsynchronousDecay {
    tmin_s: f64,
    pub(crate) a: f64,
    pub(crate) b: f64,
}

/// A row for a least time delay.
pub(crate) trait AtTime {
    /// The time.
    fn time(&self) -> Time;
}

impl AtTime for SynchronousDecay {
    fn time(&self) -> Time {
        Time::from_si(self.tmin_s)
    }
}

impl AtTime for AsynchronousDecay {
    fn time(&self) -> Time {
        Time::from_si(self.tmin_s)
    }
}

#[derive(Clone, Debug, Deserialize)]
struct EquivalentFrequency {
    cycles_below: f64,
    share: f64,
}

/// A rotating machine, for the table of resistances.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
enum Machine {
    Generator,
    Motor,
}

#[derive(Clone, Debug, Deserialize)]
struct MachineResistance {
    machine: Machine,
    above_v: f64,
    from_mva: Option<f64>,
    from_mw_a_pole_pair: Option<f64>,
    r_over_x: f64,
}

static FACTORS: LazyLock<Vec<VoltageFactor>> =
    LazyLock::new(|| table::rows(include_str!("../../data/voltage_factors.csv")));
static SYNCHRONOUS: LazyLock<Vec<SynchronousDecay>> =
    LazyLock::new(|| table::rows(include_str!("../../data/decay_synchronous.csv")));
static ASYNCHRONOUS: LazyLock<Vec<AsynchronousDecay>> =
    LazyLock::new(|| table::rows(include_str!("../../data/decay_asynchronous.csv")));
static FREQUENCIES: LazyLock<Vec<EquivalentFrequency>> =
    LazyLock::new(|| table::rows(include_str!("../../data/equivalent_frequency.csv")));
static RESISTANCES: LazyLock<Vec<MachineResistance>> =
    LazyLock::new(|| table::rows(include_str!("../../data/machine_resistances.csv")));

/// The voltage factors of a nominal voltage; `tolerance` tells the two low-voltage cases apart (6 % or 10 %) and does not count
/// above 1 kV. None where the table has no row (below 100 V). IEC 60909-0, table 1.
pub fn voltage_factor(nominal: ElectricPotential, tolerance: Ratio) -> Option<&'static VoltageFactor> {
    FACTORS.iter().find(|row| {
        let volt = nominal.si();
        let inside = volt > row.from_v && volt < row.to_v || same(volt, row.to_v);
        inside && row.tolerance_percent.is_none_or(|percent| same(percent, tolerance.si() * 100.0))
    })
}

/// The rows of mu, least time first. IEC 60909-0, equations for mu.
pub(crate) fn synchronous_decay() -> &'static [SynchronousDecay] {
    &SYNCHRONOUS
}

/// The rows of q, least time first. IEC 60909-0, equations for q.
pub(crate) fn asynchronous_decay() -> &'static [AsynchronousDecay] {
    &ASYNCHRONOUS
}

/// Equivalent frequency over frequency for the DC component after a number of cycles (f t); none beyond the table.
/// IEC 60909-0, method C for the DC component.
pub fn equivalent_frequency_share(cycles: f64) -> Option<f64> {
    FREQUENCIES.iter().find(|row| cycles < row.cycles_below).map(|row| row.share)
}

/// Fictitious R/X of a generator, for the peak current only. IEC 60909-0, clause on synchronous generators.
pub fn generator_r_over_x(rated_voltage: ElectricPotential, rated_power: Power) -> Option<f64> {
    resistance(Machine::Generator, rated_voltage, |row| row.from_mva, rated_power)
}

/// Usual R/X of an asynchronous motor, by its power a pole pair. IEC 60909-0, clause on asynchronous motors.
pub fn motor_r_over_x(rated_voltage: ElectricPotential, power_a_pole_pair: Power) -> Option<f64> {
    resistance(Machine::Motor, rated_voltage, |row| row.from_mw_a_pole_pair, power_a_pole_pair)
}

fn resistance(
    machine: Machine,
    voltage: ElectricPotential,
    from: impl Fn(&MachineResistance) -> Option<f64>,
    power: Power,
) -> Option<f64> {
    RESISTANCES
        .iter()
        .find(|row| {
            row.machine == machine
                && voltage.si() > row.above_v
                && from(row).is_some_and(|least| power.si() >= least * 1e6)
        })
        .map(|row| row.r_over_x)
}

#[cfg(test)]
pub(super) fn lengths() -> [(&'static str, &'static str, usize); 5] {
    [
        ("voltage factors", include_str!("../../data/voltage_factors.csv"), FACTORS.len()),
        ("mu", include_str!("../../data/decay_synchronous.csv"), SYNCHRONOUS.len()),
        ("q", include_str!("../../data/decay_asynchronous.csv"), ASYNCHRONOUS.len()),
        ("equivalent frequencies", include_str!("../../data/equivalent_frequency.csv"), FREQUENCIES.len()),
        ("resistances of machines", include_str!("../../data/machine_resistances.csv"), RESISTANCES.len()),
    ]
}

#[cfg(test)]
mod tests {
    use super::*;

    /// IEC 60909-0, table 1, as public documentation of a network library (pandapower) has it.
    #[test]
    fn factors_by_voltage() {
        let c = |kv: f64, percent: f64| {
            voltage_factor(ElectricPotential::from_si(kv * 1e3), Ratio::from_si(percent / 100.0)).map(|row| row.c_max)
        };
        assert_eq!(c(110.0, 10.0), Some(1.10));
        assert_eq!(c(10.0, 6.0), Some(1.10));
        assert_eq!(c(0.4, 6.0), Some(1.05));
        assert_eq!(c(0.4, 10.0), Some(1.10));
        assert_eq!(c(1.0, 6.0), Some(1.05));
        assert_eq!(c(0.024, 6.0), None);
    }

    #[test]
    fn resistances_by_voltage_and_power() {
        let kv = |n: f64| ElectricPotential::from_si(n * 1e3);
        let mega = |n: f64| Power::from_si(n * 1e6);
        assert_eq!(generator_r_over_x(kv(21.0), mega(150.0)), Some(0.05));
        assert_eq!(generator_r_over_x(kv(10.5), mega(10.0)), Some(0.07));
        assert_eq!(generator_r_over_x(kv(0.4), mega(0.5)), Some(0.15));
        assert_eq!(motor_r_over_x(kv(10.0), mega(2.5)), Some(0.10));
        assert_eq!(motor_r_over_x(kv(6.0), mega(0.5)), Some(0.15));
        assert_eq!(motor_r_over_x(kv(0.4), mega(0.05)), Some(0.42));
        assert_eq!(equivalent_frequency_share(2.0), Some(0.15));
        assert_eq!(equivalent_frequency_share(13.0), None);
    }
}
