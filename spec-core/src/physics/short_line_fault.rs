//! The line side of a short-line fault (IEC 62271-100 6.109 and annex on short-line faults, from memory).

use std::f64::consts::{PI, SQRT_2};

use super::trv::crest;
use crate::quantity::{
    ElectricCurrent, ElectricPotential, ElectricalResistance, Frequency, Length, Physical, Time, Velocity, VoltageRate,
    VoltageRatePerCurrent,
};

/// Speed of a wave along an overhead line, rounded from that of light as the trade has it: 0.3 km/us. IEEE C37.011, from memory.
fn wave_speed() -> Velocity {
    Velocity::from_si(3e8)
}

/// Time for a wave to a place at a distance and back: 2 l / v. IEEE C37.011, from memory.
pub fn there_and_back(distance: Length) -> Time {
    distance * 2.0 / wave_speed()
}

/// Rate of rise over the current broken: s = sqrt2 w Z (0.200 at 50 Hz, 0.240 at 60 Hz, kV/us per kA, for 450 ohm).
/// IEC 62271-100, characteristics of short-line faults.
pub fn rate_factor(surge_impedance: ElectricalResistance, frequency: Frequency) -> VoltageRatePerCurrent {
    VoltageRatePerCurrent::from_si(SQRT_2 * 2.0 * PI * frequency.si() * surge_impedance.si())
}

/// The first triangle of the line-side voltage.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LineSide {
    /// The current broken, IL.
    pub current: ElectricCurrent,
    /// Voltage along the line at the instant of current zero, u0.
    pub initial: ElectricPotential,
    /// Its swing at the first peak, uL = k u0.
    pub peak: ElectricPotential,
    /// Its rate of rise, s IL.
    pub rate: VoltageRate,
    /// Time to the first peak, tL = uL / (s IL).
    pub time: Time,
    /// Distance of the fault: a wave goes there and back in tL.
    pub distance: Length,
}

/// The line side of a fault that leaves `share` (0 to 1) of the breaking current `breaking` at rated voltage `rated`:
/// IL = share Isc, u0 = E1 (1 - share), uL = k u0, E1 the crest of the phase-to-earth voltage.
///
/// None for a share outside 0 to 1. IEC 62271-100, annex on short-line faults.
pub fn line_side_of_fault(
    rated: ElectricPotential,
    breaking: ElectricCurrent,
    share: f64,
    surge_impedance: ElectricalResistance,
    peak_factor: f64,
    frequency: Frequency,
) -> Option<LineSide> {
    (share > 0.0 && share < 1.0).then_some(())?;
    let current = breaking * share;
    let initial = crest(rated) * (1.0 - share);
    let peak = initial * peak_factor;
    let rate: VoltageRate = rate_factor(surge_impedance, frequency) * current;
    let time = peak / rate;
    Some(LineSide { current, initial, peak, rate, time, distance: time * wave_speed() * 0.5 })
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Own calculation: L90 of 145 kV, 40 kA, 50 Hz.
    #[test]
    fn a_fault_at_90_percent() {
        let side = line_side_of_fault(
            ElectricPotential::from_si(145e3),
            ElectricCurrent::from_si(40e3),
            0.9,
            ElectricalResistance::from_si(450.0),
            1.6,
            Frequency::from_si(50.0),
        )
        .expect("a share");
        assert!((side.peak.si() / 1e3 - 18.94).abs() < 0.005);
        assert!((side.rate.si() / 1e9 - 7.2).abs() < 0.005);
        assert!((side.time.si() * 1e6 - 2.63).abs() < 0.005);
        assert!((there_and_back(side.distance).si() - side.time.si()).abs() < 1e-15);
    }

    #[test]
    fn only_a_share_of_the_current() {
        for share in [0.0, 1.0, 1.2, -0.1, f64::NAN] {
            let ohm = ElectricalResistance::from_si(450.0);
            let (u, i, f) = (ElectricPotential::from_si(1e5), ElectricCurrent::from_si(1e4), Frequency::from_si(50.0));
            assert_eq!(line_side_of_fault(u, i, share, ohm, 1.6, f), None);
        }
    }
}
