//! The initial transient recovery voltage of a busbar (IEC 62271-100, initial TRV, from memory).

use std::f64::consts::{PI, SQRT_2};

use crate::quantity::{ElectricCurrent, ElectricPotential, ElectricalResistance, Frequency, Time};

/// The first peak of the initial TRV over the current broken, fi = sqrt2 w Zb ti: an impedance, ohm (0.046 kV/kA is 46 mohm).
///
/// `surge_impedance` is that of the busbar, `time` that to the first peak. IEC 62271-100, initial TRV; follows from a ramp of
/// current into a surge impedance.
pub fn initial_factor(surge_impedance: ElectricalResistance, time: Time, frequency: Frequency) -> ElectricalResistance {
    surge_impedance * (SQRT_2 * 2.0 * PI * (frequency * time).value)
}

/// The first peak of the initial TRV, ui = fi I. V. IEC 62271-100, initial TRV.
pub fn initial_peak(factor: ElectricalResistance, breaking: ElectricCurrent) -> ElectricPotential {
    factor * breaking
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::quantity::Physical;

    /// Own calculation: 260 ohm and 0.6 us at 50 Hz give 0.0693 kV/kA, so 40 kA give 2.77 kV.
    #[test]
    fn at_245_kv() {
        let factor =
            initial_factor(ElectricalResistance::from_si(260.0), Time::from_si(0.6e-6), Frequency::from_si(50.0));
        assert!((factor.si() - 0.0693).abs() < 5e-5);
        assert!((initial_peak(factor, ElectricCurrent::from_si(40e3)).si() - 2772.0).abs() < 3.0);
    }
}
