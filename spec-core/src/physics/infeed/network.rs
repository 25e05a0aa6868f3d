//! Network feeders, lines, cables, series reactors and converter plants (IEC 60909-0).

use super::{Element, Impedance, Infeed, ZeroAcross, ZeroSequence};
use crate::quantity::{
    ElectricCurrent, ElectricPotential, ElectricalResistance, ImpedancePerLength, Length, Physical, Power, Ratio,
    TemperatureInterval,
};

/// How strong a network feeder is, at its nominal voltage.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum FeederStrength {
    /// Ik''.
    Current(ElectricCurrent),
    /// Sk''.
    Level(Power),
}

/// What is known of the zero sequence of a network feeder.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum FeederZero {
    /// Nothing.
    Unknown,
    /// X0/X1 and R0/X0.
    Ratios {
        /// X0 over X1.
        x0_over_x1: f64,
        /// R0 over X0.
        r0_over_x0: f64,
    },
    /// Its single-phase current Ik1''; Z0 is then taken at the angle of Z1.
    SinglePhase(ElectricCurrent),
}

/// A network feeder.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct NetworkFeeder {
    /// Its nominal voltage, phase to phase, rms.
    pub nominal: ElectricPotential,
    /// Its strength.
    pub strength: FeederStrength,
    /// The voltage factor c of its strength.
    pub c: f64,
    /// R/X.
    pub r_over_x: f64,
    /// The zero sequence.
    pub zero: FeederZero,
}

impl NetworkFeeder {
    /// ZQ = c UnQ^2 / SkQ'' = c UnQ / (sqrt3 IkQ''), XQ = ZQ / sqrt(1 + (R/X)^2); X0 and R0 by their ratios. Ohm at its nominal
    /// voltage. IEC 60909-0, clause on network feeders.
    ///
    /// A single-phase current greater than three times the three-phase one at most (Z0 = 0) is none that Z0 can explain: unknown.
    pub fn infeed(&self) -> Infeed {
        let magnitude: ElectricalResistance = match self.strength {
            FeederStrength::Current(current) => self.nominal * self.c / (current * 3f64.sqrt()),
            FeederStrength::Level(level) => self.nominal * self.nominal * self.c / level,
        };
        let positive = Impedance::of_magnitude(magnitude, self.r_over_x);
        let zero = match self.zero {
            FeederZero::Unknown => ZeroSequence::Unknown,
            FeederZero::Ratios { x0_over_x1, r0_over_x0 } => {
                let reactance = positive.reactance() * x0_over_x1;
                ZeroSequence::Path(Impedance::new(reactance * r0_over_x0, reactance))
            }
            FeederZero::SinglePhase(current) => {
                let whole: ElectricalResistance = self.nominal * (self.c * 3f64.sqrt()) / current;
                let factor = (whole / magnitude).value - 2.0;
                if factor > 0.0 && factor.is_finite() {
                    ZeroSequence::Path(positive.scaled(factor))
                } else if current.si() == 0.0 {
                    ZeroSequence::Open
                } else {
                    ZeroSequence::Unknown
                }
            }
        };
        Infeed::of_impedance(positive, zero)
    }
}

/// A line or a cable, by its impedances a length.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PassiveElement {
    /// Length of the route.
    pub length: Length,
    /// Positive-sequence resistance a length, at 20 degC.
    pub resistance: ImpedancePerLength,
    /// Positive-sequence reactance a length.
    pub reactance: ImpedancePerLength,
    /// Zero-sequence resistance and reactance a length, where stated.
    pub zero: Option<(ImpedancePerLength, ImpedancePerLength)>,
}

/// Change of the resistance of copper, aluminium and their alloys, 1/K. IEC 60909-0, from memory.
const TEMPERATURE_COEFFICIENT: f64 = 0.004;

impl PassiveElement {
    /// Z = (R' + jX') l, Z0 likewise. Ohm. IEC 60909-0, clause on lines and cables.
    pub fn element(&self) -> Element {
        let along = |resistance: ImpedancePerLength, reactance: ImpedancePerLength| {
            Impedance::new(resistance * self.length, reactance * self.length)
        };
        let zero = self.zero.map_or(ZeroSequence::Unknown, |(r, x)| ZeroSequence::Path(along(r, x)));
        Element { positive: along(self.resistance, self.reactance), zero: ZeroAcross::Along(zero), ratio: 1.0 }
    }

    /// The same, `above` 20 degC: R (1 + 0.004/K above). For the least current only. IEC 60909-0, from memory.
    #[must_use]
    pub fn warmer(&self, above: TemperatureInterval) -> Self {
        let factor = 1.0 + TEMPERATURE_COEFFICIENT * above.si();
        Self { resistance: self.resistance * factor, zero: self.zero.map(|(r, x)| (r * factor, x)), ..*self }
    }
}

/// A series reactor: the same impedance in every sequence. From its impedance voltage uk (share), rated current and the nominal
/// voltage of the system: X = uk Un / (sqrt3 Ir). Ohm. IEC 60909-0, clause on short-circuit limiting reactors, from memory.
pub fn series_reactor(uk: Ratio, nominal: ElectricPotential, rated: ElectricCurrent) -> Element {
    let reactance: ElectricalResistance = nominal * uk / (rated * 3f64.sqrt());
    Element::of_impedance(Impedance::new(ElectricalResistance::from_si(0.0), reactance))
}

impl Element {
    /// An impedance in series that is the same in every sequence, as of a reactor without coupling between its phases.
    pub fn of_impedance(impedance: Impedance) -> Self {
        Self { positive: impedance, zero: ZeroAcross::Along(ZeroSequence::Path(impedance)), ratio: 1.0 }
    }
}

/// A plant behind full-size converters: a source of current.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ConverterPlant {
    /// The greatest current that it gives to a three-phase fault at its terminals, A, rms.
    pub current: ElectricCurrent,
}

impl ConverterPlant {
    /// It adds to Ik'' by magnitude, has no impedance and no part in unbalanced faults here. IEC 60909-0:2016, clause on power
    /// station units with full-size converters, from memory.
    pub fn infeed(&self) -> Infeed {
        Infeed::of_current(self.current)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::physics::infeed::Fault;
    use crate::quantity::Frequency;

    fn kv(n: f64) -> ElectricPotential {
        ElectricPotential::from_si(n * 1e3)
    }

    fn feeder(zero: FeederZero) -> NetworkFeeder {
        NetworkFeeder {
            nominal: kv(110.0),
            strength: FeederStrength::Current(ElectricCurrent::from_si(16e3)),
            c: 1.1,
            r_over_x: 0.1,
            zero,
        }
    }

    /// The current that a feeder was stated by comes back, whichever way it was stated; so does its single-phase current.
    #[test]
    fn a_feeder_gives_its_own_current() {
        let by_current = feeder(FeederZero::SinglePhase(ElectricCurrent::from_si(12e3)));
        let level = Power::from_si(3f64.sqrt() * 110e3 * 16e3);
        for feeder in [by_current, NetworkFeeder { strength: FeederStrength::Level(level), ..by_current }] {
            let infeed = feeder.infeed();
            let fault = Fault::new(&infeed, kv(110.0), 1.1, Frequency::from_si(50.0));
            assert!((fault.three_phase().si() - 16e3).abs() < 1e-6);
            assert!((fault.single_phase().expect("Z0").si() - 12e3).abs() < 1e-6);
            assert!((fault.two_phase().expect("Z1").si() - 16e3 * 3f64.sqrt() / 2.0).abs() < 1e-6);
        }
    }

    #[test]
    fn a_single_phase_current_that_no_impedance_explains() {
        let too_great = feeder(FeederZero::SinglePhase(ElectricCurrent::from_si(30e3)));
        assert_eq!(too_great.infeed().zero(), ZeroSequence::Unknown);
        assert_eq!(feeder(FeederZero::SinglePhase(ElectricCurrent::from_si(0.0))).infeed().zero(), ZeroSequence::Open);
    }

    /// Own calculation: 10 km of 0.12 + j0.39 ohm/km; 80 degC raise the resistance by 24 %.
    #[test]
    fn lines_and_reactors() {
        let per_km = |n: f64| ImpedancePerLength::from_si(n * 1e-3);
        let line = PassiveElement {
            length: Length::from_si(10e3),
            resistance: per_km(0.12),
            reactance: per_km(0.39),
            zero: Some((per_km(0.32), per_km(1.26))),
        };
        let element = line.element();
        assert!((element.positive.resistance().si() - 1.2).abs() < 1e-12);
        assert!((element.positive.reactance().si() - 3.9).abs() < 1e-12);
        let warm = line.warmer(TemperatureInterval::from_si(60.0)).element();
        assert!((warm.positive.resistance().si() - 1.2 * 1.24).abs() < 1e-12);
        let reactor = series_reactor(Ratio::from_si(0.06), kv(10.0), ElectricCurrent::from_si(1000.0));
        assert!((reactor.positive.reactance().si() - 0.3464).abs() < 1e-4);
    }
}
