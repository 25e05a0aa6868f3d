//! The DC component of the breaking current (IEC 62271-100 5.101 and IEC/TR 62271-306, from memory).

use std::f64::consts::SQRT_2;

use crate::quantity::{ElectricCurrent, Frequency, Physical, Ratio, Time};

/// Time from the fault to contact separation: the minimum opening time and one half cycle of relay time.
pub fn contact_separation(opening: Time, frequency: Frequency) -> Time {
    opening + Time::from_si(0.5 / frequency.si())
}

/// DC component as a share of the peak of the AC component: p = exp(-t / tau).
pub fn share(separation: Time, tau: Time) -> Ratio {
    Ratio::from_si((-(separation / tau).value).exp())
}

/// Time constant that gives a share at contact separation; none for a share outside 0 to 1.
pub fn time_constant_of_share(share: Ratio, separation: Time) -> Option<Time> {
    (share.value > 0.0 && share.value < 1.0).then(|| Time::from_si(-separation.si() / share.value.ln()))
}

/// Time from the fault to contact separation that gives a share with a time constant: t = -tau ln(p); none for a share outside 0 to 1.
pub fn separation_of_share(share: Ratio, tau: Time) -> Option<Time> {
    (share.value > 0.0 && share.value < 1.0).then(|| tau * -share.value.ln())
}

/// Minimum opening time that a stated share implies: the time above less one half cycle of relay time; none where that leaves
/// nothing, so that no opening time gives such a share.
pub fn opening_of_share(share: Ratio, tau: Time, frequency: Frequency) -> Option<Time> {
    let opening = separation_of_share(share, tau)? - Time::from_si(0.5 / frequency.si());
    (opening.si() > 0.0).then_some(opening)
}

/// DC component as a current: sqrt2 I p.
pub fn dc_current(symmetrical: ElectricCurrent, share: Ratio) -> ElectricCurrent {
    symmetrical * (SQRT_2 * share.value)
}

/// Total asymmetrical current, rms: I sqrt(1 + 2 p^2). IEEE C37.04 (from memory).
pub fn total_current(symmetrical: ElectricCurrent, share: Ratio) -> ElectricCurrent {
    symmetrical * (1.0 + 2.0 * share.value * share.value).sqrt()
}

/// The symmetrical current that a breaker rated with share `rated` breaks with share `system`, at equal rms total current. An
/// indication only: the standard's own criterion is the last loop of current.
pub fn reduced_current(rating: ElectricCurrent, rated: Ratio, system: Ratio) -> ElectricCurrent {
    total_current(rating, rated) / (1.0 + 2.0 * system.value * system.value).sqrt()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ms(number: f64) -> Time {
        Time::from_si(number * 1e-3)
    }

    fn ka(number: f64) -> ElectricCurrent {
        ElectricCurrent::from_si(number * 1e3)
    }

    /// Own calculation, as in the table of rules: 24 kA at 70 ms against 25 kA at 45 ms, 45 ms after the fault.
    #[test]
    fn duty_against_rating() {
        let (system, rated) = (share(ms(45.0), ms(70.0)), share(ms(45.0), ms(45.0)));
        assert!((dc_current(ka(24.0), system).si() / 1e3 - 17.9).abs() < 0.1);
        assert!((dc_current(ka(25.0), rated).si() / 1e3 - 13.0).abs() < 0.05);
        assert!((total_current(ka(24.0), system).si() / 1e3 - 29.9).abs() < 0.1);
        assert!((total_current(ka(25.0), rated).si() / 1e3 - 28.2).abs() < 0.05);
    }

    #[test]
    fn share_and_time_constant_go_both_ways() {
        for tau in [20.0, 45.0, 133.0] {
            let p = share(ms(32.0), ms(tau));
            assert!((time_constant_of_share(p, ms(32.0)).expect("a tau").si() - tau * 1e-3).abs() < 1e-9);
        }
        assert_eq!(time_constant_of_share(Ratio::from_si(1.0), ms(32.0)), None);
    }

    /// Own calculation: 30 % with 45 ms is 54.2 ms after the fault, an opening time of 44.2 ms at 50 Hz.
    #[test]
    fn opening_time_of_a_share() {
        let (hz, tau) = (Frequency::from_si(50.0), ms(45.0));
        let opening = opening_of_share(Ratio::from_si(0.3), tau, hz).expect("an opening time");
        assert!((opening.si() * 1e3 - 44.18).abs() < 0.01, "{}", opening.si());
        let back = share(contact_separation(opening, hz), tau);
        assert!((back.value - 0.3).abs() < 1e-12);
        // 10 ms after the fault 80 % are left: no breaker opens that soon.
        assert_eq!(opening_of_share(Ratio::from_si(0.81), tau, hz), None);
        assert_eq!(opening_of_share(Ratio::from_si(0.0), tau, hz), None);
        assert_eq!(separation_of_share(Ratio::from_si(1.0), tau), None);
    }

    #[test]
    fn the_reduced_current_has_the_same_total() {
        let (rated, system) = (share(ms(40.0), ms(45.0)), share(ms(40.0), ms(66.8)));
        let reduced = reduced_current(ka(31.5), rated, system);
        assert!((total_current(reduced, system).si() - total_current(ka(31.5), rated).si()).abs() < 1e-6);
        assert!(reduced < ka(31.5));
    }
}
