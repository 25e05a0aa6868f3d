//! Short-circuit currents at a connection point (IEC 60909-0).

use std::f64::consts::{PI, SQRT_2};

use num_complex::Complex64;

use super::decay::FAR_FROM_MACHINE;
use super::{Infeed, Machine, View, ZeroSequence, asynchronous_decay_factor, synchronous_decay_factor};
use crate::physics::short_circuit::{dc_heat, peak_current, peak_factor};
use crate::quantity::{ElectricCurrent, ElectricPotential, Frequency, Physical, Time};
use crate::standards::equivalent_frequency_share;

/// How the peak factor of several branches is found (IEC 60909-0, clause on the peak current in meshed networks).
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum PeakMethod {
    /// A: the least R/X of the branches.
    LeastRatio,
    /// B: R/X at the point, with the safety factor 1.15 and its cap.
    RatioAtPoint,
    /// C: R/X at the equivalent frequency (20 Hz at 50 Hz, 24 Hz at 60 Hz).
    EquivalentFrequency,
}

/// Equivalent frequency of method C over that of the network: 20/50 and 24/60. IEC 60909-0, method C.
pub const EQUIVALENT_SHARE: f64 = 0.4;

/// Safety factor of method B. IEC 60909-0, method B.
const METHOD_B: f64 = 1.15;

/// Below this R/X in every branch method B needs no safety factor. IEC 60909-0, method B, from memory.
const METHOD_B_RATIO: f64 = 0.3;

/// Caps of method B up to 1 kV and above. IEC 60909-0, method B.
const METHOD_B_CAPS: (f64, f64) = (1.8, 2.0);

/// A fault at a connection point.
#[derive(Clone, Copy, Debug)]
pub struct Fault<'a> {
    infeed: &'a Infeed,
    nominal: ElectricPotential,
    c: f64,
    frequency: Frequency,
}

impl<'a> Fault<'a> {
    /// A fault where the sources are `infeed`, the nominal voltage (phase to phase, rms) is `nominal` and its factor is `c`.
    pub fn new(infeed: &'a Infeed, nominal: ElectricPotential, c: f64, frequency: Frequency) -> Self {
        Self { infeed, nominal, c, frequency }
    }

    /// c Un over an impedance.
    fn over(&self, ohms: f64) -> ElectricCurrent {
        ElectricCurrent::from_si(self.c * self.nominal.si() / ohms)
    }

    /// Current of the voltage sources: c Un / (sqrt3 |Z1|).
    fn of_voltage_sources(&self) -> ElectricCurrent {
        let z = self.infeed.positive();
        z.map_or(ElectricCurrent::from_si(0.0), |z| self.over(3f64.sqrt() * z.magnitude().si()))
    }

    /// Initial three-phase current Ik'' = c Un / (sqrt3 |Z1|), and the current of converter plants by magnitude. A, rms.
    /// IEC 60909-0, equation for Ik''.
    pub fn three_phase(&self) -> ElectricCurrent {
        self.of_voltage_sources() + self.infeed.converter
    }

    /// Initial two-phase current Ik2'' = c Un / |Z1 + Z2| with Z2 = Z1. A, rms; none without voltage sources.
    /// IEC 60909-0, equation for Ik2''.
    pub fn two_phase(&self) -> Option<ElectricCurrent> {
        Some(self.over(2.0 * self.infeed.positive()?.magnitude().si()))
    }

    /// Z1 and 1/Z0, which is zero where no zero-sequence current passes; none where either is unknown.
    fn sequences(&self) -> Option<(Complex64, Option<Complex64>)> {
        let positive = self.infeed.positive()?.ohms();
        match self.infeed.zero() {
            ZeroSequence::Unknown => None,
            ZeroSequence::Open => Some((positive, None)),
            ZeroSequence::Path(zero) => Some((positive, Some(zero.ohms()))),
        }
    }

    /// Initial phase-to-earth current Ik1'' = sqrt3 c Un / |Z1 + Z2 + Z0|. A, rms; zero where no zero-sequence current passes, none
    /// where Z0 is unknown. IEC 60909-0, equation for Ik1'', from memory.
    pub fn single_phase(&self) -> Option<ElectricCurrent> {
        let (z1, z0) = self.sequences()?;
        Some(z0.map_or(ElectricCurrent::from_si(0.0), |z0| self.over((2.0 * z1 + z0).norm() / 3f64.sqrt())))
    }

    /// Current through earth of a two-phase fault to earth, IkE2E'' = sqrt3 c Un / |Z1 + 2 Z0| with Z2 = Z1. A, rms; as above
    /// where there is no path or it is unknown. IEC 60909-0, equation for IkE2E'', from memory.
    pub fn two_phase_earth(&self) -> Option<ElectricCurrent> {
        let (z1, z0) = self.sequences()?;
        Some(z0.map_or(ElectricCurrent::from_si(0.0), |z0| self.over((z1 + 2.0 * z0).norm() / 3f64.sqrt())))
    }

    /// The greater of the two phase currents of a two-phase fault to earth, c Un |Z0 - a Z2| / |Z1 Z2 + Z1 Z0 + Z2 Z0| with a or
    /// a^2 by phase. A, rms; none where Z0 is unknown. IEC 60909-0, equations for Ik2EL2'' and Ik2EL3'', from memory.
    pub fn two_phase_earth_phase(&self) -> Option<ElectricCurrent> {
        let (z1, z0) = self.sequences()?;
        let Some(z0) = z0 else { return self.two_phase() };
        let turn = Complex64::from_polar(1.0, 2.0 * PI / 3.0);
        let greater = (z0 - turn * z1).norm().max((z0 - turn.conj() * z1).norm());
        Some(self.over((z1 * z1 + 2.0 * z1 * z0).norm() / greater))
    }

    /// Peak factor kappa, 1.02 to 2; none without voltage sources. IEC 60909-0, clause on the peak current.
    ///
    /// Generators enter with their fictitious resistance. A single chain of elements is no mesh: method B adds nothing to it.
    pub fn peak_factor(&self, method: PeakMethod) -> Option<f64> {
        let network = &self.infeed.network;
        let peak = View { peak: true, share: 1.0 };
        match method {
            PeakMethod::LeastRatio => network.ratios(peak).map(|(least, _)| peak_factor(least)),
            PeakMethod::RatioAtPoint => {
                let kappa = self.factor_of_heat(method)?;
                let needs =
                    !network.is_one_branch() && network.ratios(peak).is_some_and(|(_, most)| most >= METHOD_B_RATIO);
                let cap = if self.nominal.si() <= 1e3 { METHOD_B_CAPS.0 } else { METHOD_B_CAPS.1 };
                Some(if needs { (METHOD_B * kappa).min(cap) } else { kappa })
            }
            PeakMethod::EquivalentFrequency => {
                let z = network.seen(View { peak: true, share: EQUIVALENT_SHARE })?;
                Some(peak_factor(z.r_over_x() * EQUIVALENT_SHARE))
            }
        }
    }

    /// kappa of the R/X that a method takes, without the safety factor of method B: that belongs to the peak, not to the heat of the
    /// DC component.
    fn factor_of_heat(&self, method: PeakMethod) -> Option<f64> {
        match method {
            PeakMethod::RatioAtPoint => {
                let seen = self.infeed.network.seen(View { peak: true, share: 1.0 })?;
                Some(peak_factor(seen.r_over_x()))
            }
            PeakMethod::LeastRatio | PeakMethod::EquivalentFrequency => self.peak_factor(method),
        }
    }

    /// Peak current ip = kappa sqrt2 Ik'', converter plants with the peak of their own current. A, peak. IEC 60909-0, equation for ip.
    pub fn peak(&self, method: PeakMethod) -> ElectricCurrent {
        let of_sources =
            self.peak_factor(method).map(|kappa| peak_current(self.of_voltage_sources(), kappa)).unwrap_or_default();
        of_sources + self.infeed.converter * SQRT_2
    }

    /// Symmetrical breaking current Ib after the least time delay `tmin`. A, rms.
    ///
    /// Machines that feed the point by themselves give mu Ik'' (motors mu q Ik''); of those that feed it together with others
    /// through one element the voltage drop in the machine counts, as phasors:
    /// Ib = Ik'' - sum dU'' / (c Un / sqrt3) (1 - mu q) IkG'', dU'' = j Xd'' K IkG''. Motors with no more than twice their rated
    /// current are far off: q is 1. IEC 60909-0, clause on Ib, from memory; reproduces the breaking currents of a ten-node network
    /// in the tests of pandapower.
    pub fn breaking(&self, tmin: Time) -> ElectricCurrent {
        let Some(z) = self.infeed.positive() else { return self.infeed.converter };
        let initial = self.of_voltage_sources().si() * Complex64::from_polar(1.0, -z.ohms().arg());
        let lost: Complex64 = self.infeed.machines.iter().map(|machine| lost(machine, initial, z.ohms(), tmin)).sum();
        ElectricCurrent::from_si((initial - lost).norm()) + self.infeed.converter
    }

    /// Time constant of the DC component: (X/R) / (2 pi f); with an instant, by the equivalent frequency for it. s; none without
    /// voltage sources or without resistance. IEC 60909-0, clause on the DC component, from memory.
    ///
    /// Generators enter with their true resistance.
    pub fn time_constant(&self, instant: Option<Time>) -> Option<Time> {
        let share = instant.and_then(|t| equivalent_frequency_share((self.frequency * t).value)).unwrap_or(1.0);
        let z = self.infeed.network.seen(View { peak: false, share })?;
        let ratio = z.r_over_x() * share;
        (ratio > 0.0).then(|| Time::from_si(1.0 / (2.0 * PI * self.frequency.si() * ratio)))
    }

    /// DC component at an instant: sqrt2 Ik'' exp(-t/tau). A; none as above. IEC 60909-0, equation for id.c.
    pub fn dc_component(&self, instant: Time) -> Option<ElectricCurrent> {
        let tau = self.time_constant(Some(instant))?;
        Some(self.of_voltage_sources() * (SQRT_2 * (-(instant / tau).value).exp()))
    }

    /// Thermal equivalent current Ith = Ik'' sqrt(m + n) over `duration`, with n of [`steady_heat`] or 1 far from generators.
    /// A, rms; none without voltage sources. IEC 60909-0, equations for Ith and m. The safety factor of method B stays out of m.
    pub fn thermal(&self, method: PeakMethod, duration: Time, n: f64) -> Option<ElectricCurrent> {
        let m = dc_heat(self.factor_of_heat(method)?, self.frequency, duration);
        Some(self.three_phase() * (m + n).sqrt())
    }
}

/// What the current of a machine has lost of its part of `initial`, A; `z` is what the point sees.
fn lost(machine: &Machine, initial: Complex64, z: Complex64, tmin: Time) -> Complex64 {
    let current = initial * machine.share;
    let magnitude = ElectricCurrent::from_si(current.norm());
    let mu = synchronous_decay_factor(magnitude, machine.rated, tmin);
    let far = (magnitude / machine.rated).value <= FAR_FROM_MACHINE;
    let q = machine.power_a_pole_pair.filter(|_| !far).map_or(1.0, |power| asynchronous_decay_factor(power, tmin));
    let drop = if machine.meshed { machine.own.ohms() * machine.share / z } else { Complex64::new(1.0, 0.0) };
    current * drop * (1.0 - mu * q)
}

/// Heat of the AC component as a share of that of an undiminished one, n; 1 for Ik''/Ik up to 1.25, as far from generators.
///
/// `initial` is Ik'', `steady` Ik, `duration` Tk. The integral of the square of Ik + (Ik' - Ik) exp(-t/T') + (Ik'' - Ik') exp(-10t/T')
/// over Tk, with Ik'/Ik = (Ik''/Ik) / (0.88 + 0.17 Ik''/Ik) and T' = 3.1 s / (Ik'/Ik), over Ik''^2 Tk. IEC 60909-0, annex on m and n,
/// from memory.
pub fn steady_heat(initial: ElectricCurrent, steady: ElectricCurrent, duration: Time) -> f64 {
    let ratio = (initial / steady).value;
    if ratio <= NO_DECAY || duration.si() <= 0.0 {
        return 1.0;
    }
    let transient = ratio / (0.88 + 0.17 * ratio);
    let rate = transient / 3.1;
    let terms = [(1.0, 0.0), (transient - 1.0, rate), (ratio - transient, 10.0 * rate)];
    // The square of a sum of exponentials, integrated term by term.
    let span = duration.si();
    let integral: f64 = terms
        .iter()
        .flat_map(|(a, p)| terms.iter().map(move |(b, q)| (a * b, p + q)))
        .map(|(product, rate)| product * if rate == 0.0 { span } else { (1.0 - (-rate * span).exp()) / rate })
        .sum();
    integral / (ratio * ratio * span)
}

/// Up to this Ik''/Ik the annex on m and n gives n = 1. IEC 60909-0, from memory.
const NO_DECAY: f64 = 1.25;

#[cfg(test)]
mod tests {
    use super::*;
    use crate::physics::infeed::{Element, Impedance, SynchronousGenerator};
    use crate::quantity::{ElectricalResistance, Power, Ratio};

    const FIFTY: f64 = 50.0;

    fn z(r: f64, x: f64) -> Impedance {
        Impedance::new(ElectricalResistance::from_si(r), ElectricalResistance::from_si(x))
    }

    fn fault(infeed: &Infeed, kv: f64) -> Fault<'_> {
        Fault::new(infeed, ElectricPotential::from_si(kv * 1e3), 1.1, Frequency::from_si(FIFTY))
    }

    /// With Z0 = Z1 all four currents follow from that of three phases: the same, sqrt3/2 and the same (symmetrical components).
    #[test]
    fn unbalanced_faults_with_equal_sequences() {
        let infeed = Infeed::of_impedance(z(0.1, 2.0), ZeroSequence::Path(z(0.1, 2.0)));
        let fault = fault(&infeed, 110.0);
        let three = fault.three_phase().si();
        for (got, factor) in [
            (fault.two_phase(), 3f64.sqrt() / 2.0),
            (fault.single_phase(), 1.0),
            (fault.two_phase_earth(), 1.0),
            (fault.two_phase_earth_phase(), 1.0),
        ] {
            assert!((got.expect("a current").si() - three * factor).abs() < 1e-6 * three);
        }
    }

    #[test]
    fn without_zero_sequence() {
        let open = Infeed::of_impedance(z(0.1, 2.0), ZeroSequence::Open);
        assert_eq!(fault(&open, 10.0).single_phase(), Some(ElectricCurrent::from_si(0.0)));
        assert_eq!(fault(&open, 10.0).two_phase_earth_phase(), fault(&open, 10.0).two_phase());
        let unknown = Infeed::of_impedance(z(0.1, 2.0), ZeroSequence::Unknown);
        assert_eq!(fault(&unknown, 10.0).single_phase(), None);
        assert_eq!(fault(&unknown, 10.0).two_phase_earth(), None);
    }

    /// Methods agree on one branch; B adds 15 % only where a branch has R/X of 0.3 or more, and is capped. Own calculation.
    #[test]
    fn methods_of_the_peak_factor() {
        let at = |infeed: &Infeed, kv: f64, method| fault(infeed, kv).peak_factor(method).expect("kappa");
        let one = Infeed::of_impedance(z(1.0, 2.0), ZeroSequence::Open);
        for method in [PeakMethod::LeastRatio, PeakMethod::RatioAtPoint, PeakMethod::EquivalentFrequency] {
            assert!((at(&one, 20.0, method) - peak_factor(0.5)).abs() < 1e-12);
        }
        let two = one.parallel(&Infeed::of_impedance(z(0.1, 2.0), ZeroSequence::Open));
        assert!((at(&two, 20.0, PeakMethod::LeastRatio) - peak_factor(0.05)).abs() < 1e-12);
        let at_point = peak_factor(two.positive().expect("Z1").r_over_x());
        assert!((at(&two, 20.0, PeakMethod::RatioAtPoint) - 1.15 * at_point).abs() < 1e-12);
        assert_eq!(at(&two, 0.4, PeakMethod::RatioAtPoint), 1.8f64.min(1.15 * at_point));
        let low = one.parallel(&Infeed::of_impedance(z(0.0, 0.02), ZeroSequence::Open));
        assert_eq!(at(&low, 20.0, PeakMethod::RatioAtPoint), 2.0);
        // The equivalent frequency gives more than R/X at the point: the inductive branch carries more of the slow current.
        assert!(at(&two, 20.0, PeakMethod::EquivalentFrequency) > at_point);
        let alike = one.times(3);
        assert!((at(&alike, 20.0, PeakMethod::RatioAtPoint) - peak_factor(0.5)).abs() < 1e-12);
    }

    /// The safety factor of method B raises the peak and leaves the heat as it is: R/X at the point decides m. Own calculation.
    #[test]
    fn the_safety_factor_of_the_peak_is_none_of_the_heat() {
        let two = Infeed::of_impedance(z(1.0, 2.0), ZeroSequence::Open)
            .parallel(&Infeed::of_impedance(z(0.1, 2.0), ZeroSequence::Open));
        let fault = fault(&two, 20.0);
        let at_point = peak_factor(two.positive().expect("Z1").r_over_x());
        assert!(fault.peak_factor(PeakMethod::RatioAtPoint).expect("kappa") > at_point * 1.1);
        let second = Time::from_si(1.0);
        let m = dc_heat(at_point, Frequency::from_si(FIFTY), second);
        let thermal = fault.thermal(PeakMethod::RatioAtPoint, second, 1.0).expect("Ith");
        assert!((thermal / fault.three_phase()).value.powi(2) - (m + 1.0) < 1e-12);
        assert!((thermal / fault.three_phase()).value.powi(2) - (m + 1.0) > -1e-12);
    }

    /// Own calculation: R/X 0.07 at 50 Hz is 45.5 ms; without an instant the DC component of one branch is the same.
    #[test]
    fn dc_component() {
        let infeed = Infeed::of_impedance(z(0.07, 1.0), ZeroSequence::Open);
        let fault = fault(&infeed, 110.0);
        let tau = fault.time_constant(None).expect("tau");
        assert!((tau.si() * 1e3 - 45.47).abs() < 0.01);
        let instant = Time::from_si(0.045);
        assert!((fault.time_constant(Some(instant)).expect("tau").si() - tau.si()).abs() < 1e-12);
        let share = fault.dc_component(instant).expect("DC") / (fault.three_phase() * SQRT_2);
        assert!((share.value - (-0.045 / tau.si()).exp()).abs() < 1e-12);
    }

    /// A generator beside a network through a common reactor: the currents divide as impedances say, and the drop in the generator
    /// decides what is lost. Own calculation.
    #[test]
    fn breaking_current_behind_a_common_element() {
        let generator = SynchronousGenerator {
            rated_voltage: ElectricPotential::from_si(10.5e3),
            rated_power: Power::from_si(50e6),
            subtransient: Ratio::from_si(0.15),
            resistance: None,
            power_factor: 0.85,
            voltage_range: Ratio::from_si(0.0),
            zero: ZeroSequence::Open,
        };
        let source = generator.infeed(ElectricPotential::from_si(10e3), 1.1);
        let network = Infeed::of_impedance(z(0.01, 0.4), ZeroSequence::Unknown);
        let together = source.parallel(&network).through(&Element::of_impedance(z(0.0, 0.05)));
        let tmin = Time::from_si(0.1);
        let (zg, zn) = (source.positive().expect("Z1").ohms(), Complex64::new(0.01, 0.4));
        let beside = zg * zn / (zg + zn);
        let all = Complex64::new(1.1 * 10e3 / 3f64.sqrt(), 0.0) / (beside + Complex64::new(0.0, 0.05));
        let own = all * beside / zg;
        let mu = synchronous_decay_factor(ElectricCurrent::from_si(own.norm()), generator.rated_current(), tmin);
        let drop = Complex64::new(0.0, zg.im) * own / (1.1 * 10e3 / 3f64.sqrt());
        assert!(mu < 0.95, "{mu}");
        let expected = (all - drop * own * (1.0 - mu)).norm();
        assert!((fault(&together, 10.0).breaking(tmin).si() - expected).abs() < 1e-6 * expected);
        // By itself its whole current decays.
        let alone = source.through(&Element::of_impedance(z(0.0, 0.05)));
        let initial = fault(&alone, 10.0).three_phase();
        let mu = synchronous_decay_factor(initial, generator.rated_current(), tmin);
        assert!((fault(&alone, 10.0).breaking(tmin).si() - mu * initial.si()).abs() < 1e-6 * initial.si());
    }

    /// n falls from 1 with time and with Ik''/Ik; 0.5 and less for a strong decay over seconds. Own calculation against a sum in
    /// small steps.
    #[test]
    fn heat_of_a_decaying_current() {
        let ka = |n: f64| ElectricCurrent::from_si(n * 1e3);
        assert_eq!(steady_heat(ka(10.0), ka(9.0), Time::from_si(1.0)), 1.0);
        let n = steady_heat(ka(20.0), ka(5.0), Time::from_si(1.0));
        let (ratio, steps) = (4.0, 200_000);
        let transient = ratio / (0.88 + 0.17 * ratio);
        let slow = 3.1 / transient;
        let sum: f64 = (0..steps)
            .map(|at| (f64::from(at) + 0.5) / f64::from(steps))
            .map(|t| 1.0 + (transient - 1.0) * (-t / slow).exp() + (ratio - transient) * (-10.0 * t / slow).exp())
            .map(|current| current * current)
            .sum();
        assert!((n - sum / f64::from(steps) / (ratio * ratio)).abs() < 1e-6, "{n}");
        assert!(n < 0.6);
    }
}
