//! The recovery voltage that the network gives, where its infeeds say enough (methods of IEEE C37.011, from memory).

use std::f64::consts::{PI, SQRT_2};

use super::short_line_fault::there_and_back;
use super::trv::{Envelope, envelope};
use crate::quantity::{
    Capacitance, ElectricCurrent, ElectricPotential, ElectricalResistance, Frequency, Inductance, Length, Physical,
    Ratio, Time, VoltageRate,
};
use crate::standards::{Duty, SystemClass};

/// Surge impedances of one line or cable at the busbar.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SurgeImpedances {
    /// Positive sequence, Z1.
    pub positive: ElectricalResistance,
    /// Zero sequence, Z0.
    pub zero: ElectricalResistance,
}

/// Surge impedance that the first pole of a three-phase fault sees: 3 Z0 Z1 / (Z1 + 2 Z0), Z1 and Z0 those of all lines in
/// parallel; of n equal ones that is (1/n) 3 Z0 Z1 / (Z1 + 2 Z0). Ohm; none without lines. IEEE C37.011, from memory.
pub fn equivalent_surge_impedance(lines: &[SurgeImpedances]) -> Option<ElectricalResistance> {
    let parallel = |of: fn(&SurgeImpedances) -> ElectricalResistance| {
        1.0 / lines.iter().map(|line| 1.0 / of(line).si()).sum::<f64>()
    };
    let (z1, z0) = (parallel(|line| line.positive), parallel(|line| line.zero));
    let z = 3.0 * z0 * z1 / (z1 + 2.0 * z0);
    (z.is_finite() && z > 0.0).then(|| ElectricalResistance::from_si(z))
}

/// Initial rate of rise: sqrt2 w I Zeq. V/s. IEEE C37.011, from memory.
pub fn initial_rate(
    current: ElectricCurrent,
    frequency: Frequency,
    surge_impedance: ElectricalResistance,
) -> VoltageRate {
    VoltageRate::from_si(SQRT_2 * 2.0 * PI * frequency.si() * current.si() * surge_impedance.si())
}

/// A recovery voltage that lines shape: u = E (1 - exp(-t/tau)) after a delay, until the first reflection comes back.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ExponentialRise {
    /// The voltage that it tends to, E.
    pub crest: ElectricPotential,
    /// tau = L / Zeq.
    pub time_constant: Time,
    /// Initial rate, E / tau.
    pub rate: VoltageRate,
    /// Delay by the capacitance at the breaker, C Zeq.
    pub delay: Time,
    /// When the first reflection arrives; the crest rises after it. None where no line has a known length.
    pub first_reflection: Option<Time>,
}

/// The rise at a busbar of system voltage `rated`, first-pole factor `kpp`, when `current` of the lines' part is broken.
///
/// E = kpp Ur sqrt(2/3); L = kpp Ur / (sqrt3 w I), the inductance that the first pole sees, so that E / tau is the initial rate;
/// `capacitance` is that between breaker and earth, `shortest` the length of the shortest line. IEEE C37.011, from memory.
pub fn exponential_rise(
    rated: ElectricPotential,
    kpp: f64,
    current: ElectricCurrent,
    frequency: Frequency,
    surge_impedance: ElectricalResistance,
    capacitance: Capacitance,
    shortest: Option<Length>,
) -> ExponentialRise {
    let crest = super::trv::crest(rated) * kpp;
    let rate = initial_rate(current, frequency, surge_impedance);
    ExponentialRise {
        crest,
        time_constant: crest / rate,
        rate,
        delay: Time::from_si(capacitance.si() * surge_impedance.si()),
        first_reflection: shortest.map(there_and_back),
    }
}

impl ExponentialRise {
    /// The voltage at a time after current zero. It holds until the first reflection.
    pub fn at(&self, time: Time) -> ElectricPotential {
        let after = (time - self.delay).si().max(0.0);
        self.crest * (1.0 - (-after / self.time_constant.si()).exp())
    }

    /// The steepest line from the origin that touches the rise: E/tau without delay. With D = delay/tau it touches where
    /// e^x = x + 1 + D, x = (t - delay)/tau, and is E/tau e^-x. V/s. Follows from the wave; only to be used up to the first reflection.
    pub fn tangent(&self) -> VoltageRate {
        let delay = (self.delay / self.time_constant).value;
        if !(delay > 0.0 && delay.is_finite()) {
            return self.rate;
        }
        // Newton from above; the function is convex, so that every step stays above the root.
        let mut x = (2.0 * delay).sqrt().max((1.0 + delay).ln());
        for _ in 0..NEWTON_STEPS {
            let (value, slope) = (x.exp() - x - 1.0 - delay, x.exp_m1());
            x -= value / slope;
        }
        self.rate * (-x).exp()
    }

    /// The crest with the first reflection from a line whose far end is open: a wave that left with the busbar's voltage comes back
    /// after `there_and_back`, and adds K E x e^-x, x = (t - there_and_back)/tau, K = 2 Zeq/Z the part that passes from that line (or
    /// those equal ones) to the busbar with its source. The sum is greatest at x = 1 + e^(-there_and_back/tau)/K, where it is
    /// E (1 + K e^-x). Attenuation is left out. Follows from the circuit: a ramp of current into L beside the lines; the coefficient of
    /// IEEE C37.011, from memory.
    pub fn crest_with_reflection(&self, there_and_back: Time, passing: f64) -> ElectricPotential {
        let not_yet_risen = (-(there_and_back / self.time_constant).value).exp();
        if passing <= 0.0 || !passing.is_finite() {
            return self.crest;
        }
        let x = 1.0 + not_yet_risen / passing;
        self.crest * (1.0 + passing * (-x).exp())
    }

    /// The voltage when the first reflection arrives, or the crest where none is known.
    pub fn before_reflection(&self) -> ElectricPotential {
        self.first_reflection.map_or(self.crest, |time| self.at(time))
    }
}

/// Steps of Newton's method for the tangent: it doubles the digits with each.
const NEWTON_STEPS: usize = 12;

/// Inductance of the source that limits a fault: Ur / (sqrt3 w I). H. IEEE C37.011, from memory.
pub fn source_inductance(rated: ElectricPotential, current: ElectricCurrent, frequency: Frequency) -> Inductance {
    Inductance::from_si(rated.si() / (3f64.sqrt() * 2.0 * PI * frequency.si() * current.si()))
}

/// Natural frequency 1 / (2 pi sqrt(L C)). Hz.
pub fn natural_frequency(inductance: Inductance, capacitance: Capacitance) -> Frequency {
    Frequency::from_si(1.0 / (2.0 * PI * (inductance.si() * capacitance.si()).sqrt()))
}

/// Slope of the tangent from the origin to 1 - cos, over that of the chord to its peak: the greatest (1 - cos x)/x (at x = 2.3311)
/// times pi/2. The 1.138 of IEEE C37.04's 1-cosine envelope, from memory; follows from the wave.
pub const TANGENT: f64 = 1.138_217;

/// A recovery voltage that one oscillating circuit shapes, as of a fault limited by a transformer or a reactor.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct OneMinusCosine {
    /// Its peak.
    pub peak: ElectricPotential,
    /// Time to the peak, half a period.
    pub time: Time,
    /// Rate of the tangent from the origin, 1.138 peak/time.
    pub rate: VoltageRate,
    /// Where that tangent reaches the peak, t3 = peak / rate = 0.8786 time.
    pub t3: Time,
}

/// Of a circuit that swings about the crest `recovery` with `frequency`; `amplitude` is the amplitude factor, 2 undamped.
/// IEEE C37.011, from memory. The tangent is that of the undamped wave.
pub fn one_minus_cosine(recovery: ElectricPotential, amplitude: f64, frequency: Frequency) -> OneMinusCosine {
    let (peak, time) = (recovery * amplitude, Time::from_si(0.5 / frequency.si()));
    let rate: VoltageRate = peak / time * TANGENT;
    OneMinusCosine { peak, time, rate, t3: peak / rate }
}

impl OneMinusCosine {
    /// Mean rate to the peak: peak/time.
    pub fn mean_rate(&self) -> VoltageRate {
        self.peak / self.time
    }
}

/// What a breaker withstands at a share of its breaking current.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Withstand {
    /// The peak.
    pub peak: ElectricPotential,
    /// The rate of rise.
    pub rate: VoltageRate,
}

/// Share of the rated breaking current that a duty is for: its own definition. None out of phase. IEC 62271-100 6.106.
pub fn share_of_duty(duty: Duty) -> Option<f64> {
    match duty {
        Duty::T100 => Some(1.0),
        Duty::T60 => Some(0.6),
        Duty::T30 => Some(0.3),
        Duty::T10 => Some(0.1),
        Duty::OutOfPhase => None,
    }
}

/// Peak and rate of the standard envelopes at a share of the rated breaking current, linear in the share between T10, T30, T60
/// and T100; below T10 that of T10.
///
/// None above the rated current, for a share that is no positive number, and where the tables have no envelope.
/// IEC 62271-100 and IEEE C37.011 (interpolation between the duties), from memory.
pub fn withstand_at(rated: ElectricPotential, kpp: f64, class: Option<SystemClass>, share: f64) -> Option<Withstand> {
    (share > 0.0 && share <= 1.0).then_some(())?;
    let mut lower: Option<(f64, Envelope)> = None;
    for duty in [Duty::T10, Duty::T30, Duty::T60, Duty::T100] {
        let here = (share_of_duty(duty)?, envelope(rated, kpp, kpp, duty, class)?);
        if share <= here.0 {
            let Some(lower) = lower else {
                return Some(Withstand { peak: here.1.uc, rate: here.1.rate });
            };
            let part = (share - lower.0) / (here.0 - lower.0);
            let peak = lower.1.uc + (here.1.uc - lower.1.uc) * part;
            let rate = lower.1.rate + (here.1.rate - lower.1.rate) * part;
            return Some(Withstand { peak, rate });
        }
        lower = Some(here);
    }
    None
}

/// A prospective recovery voltage held against what a breaker withstands: two answers, never one.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TrvComparison {
    /// Prospective over withstood peak.
    pub peak: Ratio,
    /// Prospective over withstood rate.
    pub rate: Ratio,
}

impl Withstand {
    /// Holds a prospective peak and rate against it.
    pub fn compared_with(&self, peak: ElectricPotential, rate: VoltageRate) -> TrvComparison {
        TrvComparison { peak: peak / self.peak, rate: rate / self.rate }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn kv(n: f64) -> ElectricPotential {
        ElectricPotential::from_si(n * 1e3)
    }

    fn line(z1: f64, z0: f64) -> SurgeImpedances {
        SurgeImpedances { positive: ElectricalResistance::from_si(z1), zero: ElectricalResistance::from_si(z0) }
    }

    /// Own calculation: four lines of 350 and 600 ohm give 101.6 ohm; unequal ones in parallel by sequence.
    #[test]
    fn surge_impedances() {
        let four = equivalent_surge_impedance(&[line(350.0, 600.0); 4]).expect("lines");
        assert!((four.si() - 101.6).abs() < 0.05);
        let unequal = equivalent_surge_impedance(&[line(300.0, 500.0), line(600.0, 1000.0)]).expect("lines");
        assert!(
            (unequal.si() - equivalent_surge_impedance(&[line(200.0, 1000.0 / 3.0)]).expect("a line").si()).abs()
                < 1e-9
        );
        assert_eq!(equivalent_surge_impedance(&[]), None);
    }

    /// The crest over the time constant is the initial rate whatever kpp is; 30 km return after 200 us; delay of 5 nF.
    #[test]
    fn a_rise_until_the_first_reflection() {
        let ohm = ElectricalResistance::from_si(101.6);
        let (current, frequency) = (ElectricCurrent::from_si(40e3), Frequency::from_si(60.0));
        let rise = exponential_rise(
            kv(245.0),
            1.3,
            current,
            frequency,
            ohm,
            Capacitance::from_si(5e-9),
            Some(Length::from_si(30e3)),
        );
        assert!((rise.rate.si() / 1e9 - 2.167).abs() < 1e-3);
        assert!((rise.first_reflection.expect("a line").si() - 200e-6).abs() < 1e-12);
        assert!((rise.delay.si() - 0.508e-6).abs() < 1e-12);
        assert_eq!(rise.at(Time::from_si(0.0)).si(), 0.0);
        let early = rise.at(rise.delay + Time::from_si(1e-8)).si() / 1e-8;
        assert!((early / rise.rate.si() - 1.0).abs() < 1e-3);
        let value = rise.before_reflection().si() / rise.crest.si();
        assert!((value - (1.0 - (-(200e-6 - 0.508e-6) / rise.time_constant.si()).exp())).abs() < 1e-12);
    }

    /// The same circuit step by step: the current of the source's inductance and of the lines together is a ramp, and the wave that
    /// left on the open line comes back doubled.
    #[test]
    fn a_reflection_raises_the_crest() {
        let (current, frequency, z) = (ElectricCurrent::from_si(20e3), Frequency::from_si(50.0), 250.0);
        let (lines, kpp) = (3.0, 1.3);
        let all = ElectricalResistance::from_si(z / lines);
        let rise = exponential_rise(kv(145.0), kpp, current, frequency, all, Capacitance::default(), None);
        for microseconds in [20.0, 100.0, 400.0] {
            let (back, step) = (microseconds * 1e-6, 1e-8);
            let inductance = rise.time_constant.si() * all.si();
            let ramp = rise.crest.si() / inductance;
            let delay = (back / step) as usize;
            let mut left: Vec<f64> = Vec::new();
            let (mut through, mut greatest) = (0.0f64, 0.0f64);
            // Until the second reflection.
            for at in 0..=2 * delay {
                let arriving = at.checked_sub(delay).and_then(|then| left.get(then)).copied().unwrap_or(0.0);
                let time = at as f64 * step;
                let voltage = (ramp * time - through + 2.0 * arriving / z) * all.si();
                through += voltage / inductance * step;
                left.push(voltage - arriving);
                greatest = greatest.max(voltage);
            }
            let passing = 2.0 * all.si() / z;
            let crest = rise.crest_with_reflection(Time::from_si(back), passing).si();
            let reached = 1.0 + (-(back / rise.time_constant.si())).exp() / passing;
            // Where the crest comes before the second reflection, it is the greatest voltage.
            if reached * rise.time_constant.si() < back {
                assert!((greatest / crest - 1.0).abs() < 1e-3, "{microseconds}: {greatest} {crest}");
            } else {
                assert!(greatest <= crest * 1.001, "{microseconds}: {greatest} {crest}");
            }
        }
        assert_eq!(rise.crest_with_reflection(Time::from_si(1e-4), 0.0), rise.crest);
    }

    /// The tangent of a delayed rise is the greatest u/t, found here by trial.
    #[test]
    fn the_tangent_of_a_delayed_rise() {
        let (current, frequency) = (ElectricCurrent::from_si(40e3), Frequency::from_si(60.0));
        for nanofarad in [0.0, 1.0, 20.0, 500.0, 20_000.0] {
            let capacitance = Capacitance::from_si(nanofarad * 1e-9);
            let z = ElectricalResistance::from_si(101.6);
            let rise = exponential_rise(kv(245.0), 1.3, current, frequency, z, capacitance, None);
            let times = (1..200_000).map(|n| rise.time_constant * (f64::from(n) * 1e-4));
            let greatest = times.map(|t| (rise.at(t) / t).si()).fold(0.0, f64::max);
            let tangent = rise.tangent().si();
            assert!((greatest / tangent - 1.0).abs() < 2e-4, "{nanofarad} nF: {greatest} {tangent}");
        }
    }

    /// The factor of the tangent is the greatest of (1 - cos x)/x, found here by trial.
    #[test]
    fn the_tangent_of_a_cosine() {
        let greatest = (1..31_416).map(|n| f64::from(n) * 1e-4).map(|x| (1.0 - x.cos()) / x).fold(0.0, f64::max);
        assert!((greatest * PI / 2.0 - TANGENT).abs() < 1e-6, "{}", greatest * PI / 2.0);
    }

    /// At the shares of the duties the envelopes themselves; between them between; beyond them nothing.
    #[test]
    fn interpolation() {
        let at = |share| withstand_at(kv(145.0), 1.3, None, share);
        for duty in [Duty::T100, Duty::T60, Duty::T30, Duty::T10] {
            let own = envelope(kv(145.0), 1.3, 1.3, duty, None).expect("an envelope");
            let found = at(share_of_duty(duty).expect("a share")).expect("a withstand");
            assert!((found.peak - own.uc).si().abs() < 1e-6 && (found.rate - own.rate).si().abs() < 1e-3, "{duty:?}");
        }
        let middle = at(0.8).expect("a withstand");
        assert!((middle.rate.si() / 1e9 - 2.5).abs() < 1e-9);
        assert_eq!(at(0.05), at(0.1));
        for none in [0.0, -1.0, 1.01, f64::NAN] {
            assert_eq!(at(none), None);
        }
        assert_eq!(withstand_at(kv(72.5), 1.5, None, 0.5), None);
    }

    #[test]
    fn peak_and_rate_are_two_answers() {
        let withstand = withstand_at(kv(145.0), 1.3, None, 1.0).expect("a withstand");
        let compared = withstand.compared_with(withstand.peak * 0.9, withstand.rate * 1.2);
        assert!((compared.peak.si() - 0.9).abs() < 1e-12);
        assert!((compared.rate.si() - 1.2).abs() < 1e-12);
    }
}
