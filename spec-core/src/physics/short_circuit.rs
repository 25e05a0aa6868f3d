//! Short-circuit currents far from generators, after IEC 60909-0 (equations from memory of the standard and the public
//! documentation of general-purpose network calculation libraries).

use std::f64::consts::{PI, SQRT_2};

use crate::quantity::{ElectricCurrent, ElectricPotential, Frequency, JouleIntegral, Physical, Power, Ratio, Time};

/// Short-circuit current of a fault level: I = S / (sqrt3 U). IEC 60909-0, definition of Sk''.
pub fn current_of_fault_level(level: Power, voltage: ElectricPotential) -> ElectricCurrent {
    level / (voltage * 3f64.sqrt())
}

/// Fault level of a short-circuit current: S = sqrt3 U I.
pub fn fault_level_of_current(current: ElectricCurrent, voltage: ElectricPotential) -> Power {
    current * voltage * 3f64.sqrt()
}

/// Time constant of an X/R: tau = (X/R) / (2 pi f).
pub fn time_constant(x_over_r: f64, frequency: Frequency) -> Time {
    Time::from_si(x_over_r / (2.0 * PI * frequency.si()))
}

/// X/R of a time constant.
pub fn x_over_r(tau: Time, frequency: Frequency) -> f64 {
    2.0 * PI * frequency.si() * tau.si()
}

/// Peak factor: kappa = 1.02 + 0.98 exp(-3 R/X). IEC 60909-0, equation for kappa.
pub fn peak_factor(r_over_x: f64) -> f64 {
    1.02 + 0.98 * (-3.0 * r_over_x).exp()
}

/// Peak short-circuit current: ip = kappa sqrt2 Ik''. IEC 60909-0.
pub fn peak_current(initial: ElectricCurrent, kappa: f64) -> ElectricCurrent {
    initial * (kappa * SQRT_2)
}

/// R/X of a peak and an initial current: R/X = -ln((kappa - 1.02)/0.98)/3; none where no R/X gives such a peak.
pub fn r_over_x_of_peak(peak: ElectricCurrent, initial: ElectricCurrent) -> Option<f64> {
    let kappa = (peak / (initial * SQRT_2)).value;
    let inner = (kappa - 1.02) / 0.98;
    (inner > 0.0 && inner <= 1.0).then(|| -inner.ln() / 3.0)
}

/// Heat of the DC component as a share of that of the AC component over `duration`:
/// m = (exp(4 f T ln(kappa - 1)) - 1) / (2 f T ln(kappa - 1)). IEC 60909-0.
///
/// 0 for a kappa of 1 or less, and 2, the limit, for one of 2 or more: a DC component that does not decay has twice the heat.
pub fn dc_heat(kappa: f64, frequency: Frequency, duration: Time) -> f64 {
    if kappa <= 1.0 {
        return 0.0;
    }
    let x = 4.0 * (frequency * duration).value * (kappa - 1.0).ln();
    if x < 0.0 { 2.0 * x.exp_m1() / x } else { 2.0 }
}

/// Thermal equivalent current: Ith = Ik'' sqrt(m + n), with n = 1 far from generators. IEC 60909-0.
pub fn thermal_current(initial: ElectricCurrent, m: f64) -> ElectricCurrent {
    initial * (m + 1.0).sqrt()
}

/// Heat in one ohm: I^2 t.
pub fn joule_integral(current: ElectricCurrent, duration: Time) -> JouleIntegral {
    current * current * duration
}

/// A share as a ratio.
pub fn ratio(value: f64) -> Ratio {
    Ratio::from_si(value)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ka(number: f64) -> ElectricCurrent {
        ElectricCurrent::from_si(number * 1e3)
    }

    fn close(a: f64, b: f64, relative: f64) -> bool {
        (a - b).abs() <= relative * b.abs()
    }

    /// Own calculation, as in the table of rules: 4000 MVA is 31.9 kA at 72.5 kV and 33.5 kA at 69 kV.
    #[test]
    fn fault_levels() {
        let level = Power::from_si(4000e6);
        assert!(close(current_of_fault_level(level, ElectricPotential::from_si(72.5e3)).si(), 31.854e3, 1e-4));
        assert!(close(current_of_fault_level(level, ElectricPotential::from_si(69e3)).si(), 33.470e3, 1e-4));
        let back = fault_level_of_current(
            current_of_fault_level(level, ElectricPotential::from_si(69e3)),
            ElectricPotential::from_si(69e3),
        );
        assert!(close(back.si(), level.si(), 1e-12));
    }

    /// kappa is 2.0 without resistance and 1.02 with resistance alone (IEC 60909-0, figure of kappa, from memory).
    #[test]
    fn limits_of_the_peak_factor() {
        assert!(close(peak_factor(0.0), 2.0, 1e-12));
        assert!(close(peak_factor(10.0), 1.02, 1e-9));
        let peak = peak_current(ka(31.2), peak_factor(1.0 / x_over_r(Time::from_si(0.045), Frequency::from_si(50.0))));
        assert!(close(peak.si(), 80.0e3, 1e-3), "{}", peak.si());
    }

    #[test]
    fn peak_and_r_over_x_go_both_ways() {
        for r_over_x in [0.01, 0.0476, 0.2, 1.0] {
            let peak = peak_current(ka(20.0), peak_factor(r_over_x));
            assert!(close(r_over_x_of_peak(peak, ka(20.0)).expect("an R/X"), r_over_x, 1e-9));
        }
        assert_eq!(r_over_x_of_peak(ka(20.0), ka(20.0)), None);
    }

    /// Without a DC component (kappa towards 1.02) its heat goes to nothing; with a short duration it approaches 2 (IEC 60909-0,
    /// figure of m, from memory).
    #[test]
    fn heat_of_the_dc_component() {
        assert!(dc_heat(1.02, Frequency::from_si(50.0), Time::from_si(1.0)) < 0.01);
        assert!(close(dc_heat(1.8, Frequency::from_si(50.0), Time::from_si(1e-6)), 2.0, 1e-3));
        assert_eq!(dc_heat(1.0, Frequency::from_si(50.0), Time::from_si(1.0)), 0.0);
    }

    /// Without resistance kappa is 2 and the DC component stays at sqrt2 Ik'', whose square is twice that of Ik'' (own calculation).
    /// Method B for meshed networks is capped there, so that it is met.
    #[test]
    fn heat_of_a_dc_component_that_stays() {
        let heat = |kappa: f64| dc_heat(kappa, Frequency::from_si(50.0), Time::from_si(1.0));
        assert_eq!(heat(2.0), 2.0);
        assert!(close(heat(2.0 - 1e-9), 2.0, 1e-6));
        let rising: Vec<f64> = [1.02, 1.5, 1.8, 1.95, 1.99, 1.999, 2.0].map(heat).to_vec();
        assert!(rising.is_sorted(), "{rising:?}");
    }

    /// Examples of `tests/reference/standards/iec60909_far_examples.csv`.
    #[test]
    fn thermal_currents_far_from_generators() {
        for (current, r_over_x, hz, duration, expected) in
            [(40.0, 0.07, 50.0, 1.0, 40.962), (31.5, 0.1, 50.0, 3.0, 31.679), (25.0, 0.05, 60.0, 0.5, 26.381)]
        {
            let m = dc_heat(peak_factor(r_over_x), Frequency::from_si(hz), Time::from_si(duration));
            assert!((thermal_current(ka(current), m).si() / 1e3 - expected).abs() < 0.001, "{current}");
        }
    }
}
