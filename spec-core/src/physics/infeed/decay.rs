//! Decay of the current of machines to the symmetrical breaking current (IEC 60909-0, equations for mu and q, from memory).

use crate::quantity::{ElectricCurrent, Physical, Power, Time};
use crate::standards::{AtTime, asynchronous_decay, synchronous_decay};

/// Up to this current over its rated current a machine is far from the fault, and its current does not decay.
/// IEC 60909-0, equation for mu.
pub(super) const FAR_FROM_MACHINE: f64 = 2.0;

/// mu of a synchronous machine: breaking over initial current after the least time delay `tmin`.
///
/// `initial` and `rated` are of the machine at one voltage. Between the times of the table mu is interpolated, before the first it
/// is 1, after the last it stays. IEC 60909-0, equations for mu.
pub fn synchronous_decay_factor(initial: ElectricCurrent, rated: ElectricCurrent, tmin: Time) -> f64 {
    let ratio = (initial / rated).value;
    if ratio <= FAR_FROM_MACHINE {
        return 1.0;
    }
    at_time(synchronous_decay(), tmin, |row| row.a + row.b * (-row.exponent * ratio).exp())
}

/// q of asynchronous motors: what remains besides mu; `power_a_pole_pair` is rated mechanical power over pole pairs.
///
/// Between the times of the table q is interpolated, before the first it is 1. IEC 60909-0, equations for q.
pub fn asynchronous_decay_factor(power_a_pole_pair: Power, tmin: Time) -> f64 {
    let megawatt = power_a_pole_pair.si() / 1e6;
    at_time(asynchronous_decay(), tmin, |row| row.a + row.b * megawatt.ln())
}

/// A factor between 0 and 1 at a time, by the rows of a table.
fn at_time<R: AtTime>(rows: &[R], time: Time, factor: impl Fn(&R) -> f64) -> f64 {
    let value = |row: &R| factor(row).clamp(0.0, 1.0);
    let mut before: Option<&R> = None;
    for row in rows {
        if time < row.time() {
            // Before the first row the current is taken as undiminished: too much rather than too little.
            return before.map_or(1.0, |before| {
                let part = ((time - before.time()) / (row.time() - before.time())).value;
                value(before) + part * (value(row) - value(before))
            });
        }
        before = Some(row);
    }
    before.map_or(1.0, value)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn mu(ratio: f64, seconds: f64) -> f64 {
        synchronous_decay_factor(ElectricCurrent::from_si(ratio), ElectricCurrent::from_si(1.0), Time::from_si(seconds))
    }

    /// Own calculation by the equations of IEC 60909-0.
    #[test]
    fn of_generators() {
        assert_eq!(mu(2.0, 0.1), 1.0);
        assert!((mu(7.184, 0.1) - 0.6923).abs() < 5e-5);
        assert!((mu(5.0, 0.05) - (0.71 + 0.51 * (-1.5f64).exp())).abs() < 1e-12);
        assert!((mu(5.0, 3.0) - mu(5.0, 0.25)).abs() < 1e-12);
        assert_eq!(mu(5.0, 0.01), 1.0);
        let middle = f64::midpoint(mu(5.0, 0.05), mu(5.0, 0.1));
        assert!((mu(5.0, 0.075) - middle).abs() < 1e-12);
    }

    #[test]
    fn of_motors() {
        let q = |megawatt: f64, seconds: f64| {
            asynchronous_decay_factor(Power::from_si(megawatt * 1e6), Time::from_si(seconds))
        };
        assert!((q(2.5, 0.1) - 0.67995).abs() < 1e-5);
        assert_eq!(q(1e-4, 0.25), 0.0);
        assert_eq!(q(10.0, 0.02), 1.0);
    }
}
