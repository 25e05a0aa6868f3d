//! Recovery voltage of the first pole to clear, by symmetrical components (IEC/TR 62271-306, from memory).

use super::infeed::Impedance;
use crate::quantity::{ElectricCurrent, Physical};

/// First-pole-to-clear factor of X0/X1 = a: kpp = 3a / (1 + 2a).
pub fn first_pole_factor(x0_over_x1: f64) -> f64 {
    3.0 * x0_over_x1 / (1.0 + 2.0 * x0_over_x1)
}

/// The same of the impedances themselves: |3 Z0 / (Z1 + 2 Z0)|.
pub fn first_pole_factor_of(positive: Impedance, zero: Impedance) -> f64 {
    let (z1, z0) = (positive.ohms(), zero.ohms());
    (3.0 * z0 / (z1 + 2.0 * z0)).norm()
}

/// Factor of the second pole: sqrt3 sqrt(a^2 + a + 1) / (a + 2).
pub fn second_pole_factor(x0_over_x1: f64) -> f64 {
    let a = x0_over_x1;
    3f64.sqrt() * (a * a + a + 1.0).sqrt() / (a + 2.0)
}

/// Z0/Z1 of a three-phase and a single-phase current: 3 Ik3/Ik1 - 2, with impedances of one angle.
pub fn z0_over_z1(three_phase: ElectricCurrent, single_phase: ElectricCurrent) -> f64 {
    3.0 * three_phase.si() / single_phase.si() - 2.0
}

/// Greatest X0/X1 of an effectively earthed neutral (IEC 60071-1, from memory).
pub const EFFECTIVE_X0_OVER_X1: f64 = 3.0;

/// Greatest R0/X1 of an effectively earthed neutral (IEC 60071-1, from memory).
pub const EFFECTIVE_R0_OVER_X1: f64 = 1.0;

/// Greatest earth-fault factor of an effectively earthed neutral (IEC 60071-1, from memory).
pub const EFFECTIVE_EARTH_FAULT_FACTOR: f64 = 1.4;

#[cfg(test)]
mod tests {
    use super::*;

    /// Own calculation, as in the table of rules: Ik3 20 kA and Ik1 11 kA give 3.45 and 1.31.
    #[test]
    fn from_currents() {
        let ka = |n: f64| ElectricCurrent::from_si(n * 1e3);
        let a = z0_over_z1(ka(20.0), ka(11.0));
        assert!((a - 3.4545).abs() < 1e-3);
        assert!((first_pole_factor(a) - 1.3103).abs() < 1e-3);
    }

    /// 1.3 at a = 3.25, 1.5 as a grows; second pole 1.27 there (printed for 1.3 in IEC 62271-100, from memory).
    #[test]
    fn limits() {
        assert!((first_pole_factor(3.25) - 1.3).abs() < 1e-12);
        assert!((first_pole_factor(1e9) - 1.5).abs() < 1e-6);
        assert!((second_pole_factor(3.25) - 1.27).abs() < 0.005);
        assert!((first_pole_factor(1.0) - 1.0).abs() < 1e-12);
    }
}
