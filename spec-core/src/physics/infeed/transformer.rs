//! Transformers with two and three windings (IEC 60909-0).

use super::{Element, Impedance, Infeed, ZeroAcross, ZeroSequence};
use crate::quantity::{ElectricCurrent, ElectricPotential, ElectricalResistance, Physical, Power, Ratio};

/// How a neutral is connected to earth.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Neutral {
    /// Not at all.
    Isolated,
    /// Directly.
    Earthed,
    /// Through an impedance, which counts three times in the zero sequence.
    Through(Impedance),
}

/// How a winding is connected, as its letter in the vector group and its neutral say.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Winding {
    /// Y, y.
    Star(Neutral),
    /// D, d.
    Delta,
    /// z: its zero-sequence current needs no other winding.
    Zigzag(Neutral),
    /// Not stated.
    Unknown,
}

impl Winding {
    /// Three times the impedance of the neutral; none where no zero-sequence current enters.
    fn neutral(self) -> Option<Impedance> {
        match self {
            Self::Star(neutral) | Self::Zigzag(neutral) => match neutral {
                Neutral::Isolated => None,
                Neutral::Earthed => {
                    Some(Impedance::new(ElectricalResistance::from_si(0.0), ElectricalResistance::from_si(0.0)))
                }
                Neutral::Through(impedance) => Some(impedance.scaled(3.0)),
            },
            Self::Delta | Self::Unknown => None,
        }
    }
}

/// KT = 0.95 cmax / (1 + 0.6 xT), xT the relative reactance and cmax of the network at the low-voltage side.
/// IEC 60909-0, equation for KT.
pub fn transformer_correction(relative_reactance: f64, c_max: f64) -> f64 {
    0.95 * c_max / (1.0 + 0.6 * relative_reactance)
}

/// The relative reactance of an impedance voltage and load losses over rated power.
fn relative_reactance(impedance_voltage: f64, resistance: f64) -> f64 {
    (impedance_voltage * impedance_voltage - resistance * resistance).max(0.0).sqrt()
}

/// A transformer with two windings.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TwoWindingTransformer {
    /// Rated power.
    pub rated_power: Power,
    /// Rated voltage of the high-voltage side.
    pub high: ElectricPotential,
    /// Rated voltage of the low-voltage side.
    pub low: ElectricPotential,
    /// Impedance voltage uk.
    pub impedance_voltage: Ratio,
    /// Load losses PkrT at rated power.
    pub load_losses: Power,
    /// Zero-sequence impedance voltage; absent: that of the positive sequence, where the connection lets a current pass at all.
    pub zero: Option<Ratio>,
    /// Connection of the high-voltage winding.
    pub high_winding: Winding,
    /// Connection of the low-voltage winding.
    pub low_winding: Winding,
}

impl TwoWindingTransformer {
    fn relative_resistance(&self) -> f64 {
        (self.load_losses / self.rated_power).value
    }

    /// xT = sqrt(uk^2 - (PkrT/SrT)^2). IEC 60909-0, clause on two-winding transformers.
    pub fn relative_reactance(&self) -> f64 {
        relative_reactance(self.impedance_voltage.si(), self.relative_resistance())
    }

    /// KT, by the cmax of the network at the low-voltage side.
    pub fn correction(&self, c_max: f64) -> f64 {
        transformer_correction(self.relative_reactance(), c_max)
    }

    /// A network transformer led through from the low- to the high-voltage side: KT ZT, ohm at the high-voltage side.
    /// IEC 60909-0, clause on two-winding transformers; the zero sequence by the connection of the windings.
    pub fn upwards(&self, c_max: f64) -> Element {
        self.upwards_corrected(self.correction(c_max))
    }

    /// The same from the high- to the low-voltage side, ohm at the low-voltage side.
    pub fn downwards(&self, c_max: f64) -> Element {
        self.downwards_corrected(self.correction(c_max))
    }

    /// As seen from the side `far`, the source at the side `near`, times a correction factor.
    pub(super) fn across(
        &self,
        far: ElectricPotential,
        near: ElectricPotential,
        far_winding: &Winding,
        near_winding: &Winding,
        factor: f64,
    ) -> Element {
        let base: ElectricalResistance = far * far / self.rated_power;
        let resistance = self.relative_resistance();
        let of = |impedance_voltage: f64| {
            let reactance = relative_reactance(impedance_voltage, resistance);
            Impedance::new(base * resistance, base * reactance).scaled(factor)
        };
        let positive = of(self.impedance_voltage.si());
        let ratio = (far / near).value;
        let stated = self.zero.map(|uk0| of(uk0.si()));
        let zero = match (far_winding, near_winding) {
            (Winding::Unknown, _) => ZeroAcross::ToEarth(ZeroSequence::Unknown),
            (Winding::Delta, _) => ZeroAcross::ToEarth(ZeroSequence::Open),
            (Winding::Zigzag(_), _) => ZeroAcross::ToEarth(match (far_winding.neutral(), stated) {
                (None, _) => ZeroSequence::Open,
                // A tenth of the positive sequence or so: not to be guessed.
                (Some(_), None) => ZeroSequence::Unknown,
                (Some(neutral), Some(own)) => ZeroSequence::Path(own + neutral),
            }),
            (Winding::Star(_), near_winding) => {
                let Some(neutral) = far_winding.neutral() else {
                    return Element { positive, zero: ZeroAcross::ToEarth(ZeroSequence::Open), ratio };
                };
                let own = stated.unwrap_or(positive) + neutral;
                match (near_winding, near_winding.neutral()) {
                    (Winding::Unknown, _) => ZeroAcross::ToEarth(ZeroSequence::Unknown),
                    (Winding::Delta, _) => ZeroAcross::ToEarth(ZeroSequence::Path(own)),
                    (Winding::Star(_), Some(other)) => {
                        ZeroAcross::Along(ZeroSequence::Path(own + other.scaled(ratio * ratio)))
                    }
                    // Only the core is left: its impedance is what a stated value was measured on.
                    _ => ZeroAcross::ToEarth(match stated {
                        Some(own) => ZeroSequence::Path(own + neutral),
                        None => ZeroSequence::Open,
                    }),
                }
            }
        };
        Element { positive, zero, ratio }
    }
}

/// Impedance between two windings of a three-winding transformer.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PairOfWindings {
    /// The power that the values are for.
    pub power: Power,
    /// Impedance voltage.
    pub impedance_voltage: Ratio,
    /// Load losses at that power.
    pub load_losses: Power,
}

impl PairOfWindings {
    /// Resistance and reactance as shares of the base.
    fn relative(&self) -> (f64, f64) {
        let resistance = (self.load_losses / self.power).value;
        (resistance, relative_reactance(self.impedance_voltage.si(), resistance))
    }

    /// Z of the pair at a voltage, times a correction factor.
    fn impedance(&self, voltage: ElectricPotential, factor: f64) -> Impedance {
        let base: ElectricalResistance = voltage * voltage / self.power;
        let (resistance, reactance) = self.relative();
        Impedance::new(base * resistance, base * reactance).scaled(factor)
    }
}

/// A transformer with three windings, at the places 0, 1 and 2 (high, middle and low voltage).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ThreeWindingTransformer {
    /// Rated voltages.
    pub voltages: [ElectricPotential; 3],
    /// Connections.
    pub windings: [Winding; 3],
    /// The pairs 0-1, 0-2 and 1-2.
    pub pairs: [PairOfWindings; 3],
    /// The zero sequence of the same pairs; absent: that of the positive sequence.
    pub zero: Option<[PairOfWindings; 3]>,
}

impl ThreeWindingTransformer {
    /// Impedances of the three branches of the equivalent star, ohm at a voltage: ZA = (ZAB + ZAC - ZBC)/2, every pair corrected
    /// first. A branch may be negative. IEC 60909-0, clause on three-winding transformers.
    pub fn star(&self, voltage: ElectricPotential, c_max: f64) -> [Impedance; 3] {
        self.star_of(&self.pairs, voltage, c_max)
    }

    /// The zero-sequence impedances of the same star, with the corrections of the positive sequence; neutrals left out.
    pub fn zero_star(&self, voltage: ElectricPotential, c_max: f64) -> [Impedance; 3] {
        self.star_of(self.zero.as_ref().unwrap_or(&self.pairs), voltage, c_max)
    }

    fn star_of(&self, pairs: &[PairOfWindings; 3], voltage: ElectricPotential, c_max: f64) -> [Impedance; 3] {
        let factors = self.pairs.map(|pair| transformer_correction(pair.relative().1, c_max));
        let ([ab, ac, bc], [k_ab, k_ac, k_bc]) = (pairs, factors);
        let (ab, ac, bc) = (ab.impedance(voltage, k_ab), ac.impedance(voltage, k_ac), bc.impedance(voltage, k_bc));
        let half = |a: Impedance, b: Impedance, c: Impedance| (a + b + c.scaled(-1.0)).scaled(0.5);
        [half(ab, ac, bc), half(ab, bc, ac), half(ac, bc, ab)]
    }

    /// As seen from one winding: the sources at each of the others, in the order of the windings, or nothing there.
    /// Ohm at the winding's rated voltage. IEC 60909-0, clause on three-winding transformers.
    pub fn seen_from_high(&self, middle: Option<&Infeed>, low: Option<&Infeed>, c_max: f64) -> Infeed {
        let [voltage, ..] = self.voltages;
        let [high, m, l] = self.sides(voltage, c_max);
        seen(&high, [(&m, middle), (&l, low)])
    }

    /// As seen from the middle-voltage winding.
    pub fn seen_from_middle(&self, high: Option<&Infeed>, low: Option<&Infeed>, c_max: f64) -> Infeed {
        let [_, voltage, _] = self.voltages;
        let [h, middle, l] = self.sides(voltage, c_max);
        seen(&middle, [(&h, high), (&l, low)])
    }

    /// As seen from the low-voltage winding.
    pub fn seen_from_low(&self, high: Option<&Infeed>, middle: Option<&Infeed>, c_max: f64) -> Infeed {
        let [.., voltage] = self.voltages;
        let [h, m, low] = self.sides(voltage, c_max);
        seen(&low, [(&h, high), (&m, middle)])
    }

    fn sides(&self, voltage: ElectricPotential, c_max: f64) -> [Side; 3] {
        let (positive, zero) = (self.star(voltage, c_max), self.zero_star(voltage, c_max));
        let side = |own: ElectricPotential, winding: Winding, positive: Impedance, zero: Impedance| Side {
            winding,
            positive,
            zero,
            ratio: (voltage / own).value,
        };
        let ([a, b, c], [p, q, r], [x, y, z], [u, v, w]) = (self.voltages, self.windings, positive, zero);
        [side(a, p, x, u), side(b, q, y, v), side(c, r, z, w)]
    }
}

/// One branch of the star, referred to the side it is seen from.
struct Side {
    winding: Winding,
    positive: Impedance,
    zero: Impedance,
    /// Voltage of the side it is seen from over its own.
    ratio: f64,
}

impl Side {
    /// The zero sequence from the middle of the star through this branch to earth.
    fn zero_to_earth(&self, source: Option<&Infeed>) -> ZeroSequence {
        let square = self.ratio * self.ratio;
        match self.winding {
            Winding::Unknown => ZeroSequence::Unknown,
            Winding::Delta => ZeroSequence::Path(self.zero),
            // In a zigzag winding the currents of the other windings are not balanced.
            Winding::Zigzag(_) => ZeroSequence::Open,
            Winding::Star(_) => match (self.winding.neutral(), source) {
                (Some(neutral), Some(source)) => {
                    source.zero().scaled(square).series(ZeroSequence::Path(self.zero + neutral.scaled(square)))
                }
                _ => ZeroSequence::Open,
            },
        }
    }
}

fn seen(own: &Side, others: [(&Side, Option<&Infeed>); 2]) -> Infeed {
    let led = others.iter().filter_map(|(side, source)| {
        let zero = ZeroAcross::ToEarth(ZeroSequence::Open);
        Some((*source)?.through(&Element { positive: side.positive, zero, ratio: side.ratio }))
    });
    let led: Vec<Infeed> = led.collect();
    let inside = Infeed::all_in_parallel(&led).unwrap_or_else(|| Infeed::of_current(ElectricCurrent::default()));
    let [first, second] = others.map(|(side, source)| side.zero_to_earth(source));
    let behind = first.parallel(second);
    let zero = match own.winding {
        Winding::Unknown => ZeroSequence::Unknown,
        Winding::Delta => ZeroSequence::Open,
        Winding::Zigzag(_) if own.winding.neutral().is_some() => ZeroSequence::Unknown,
        Winding::Star(_) | Winding::Zigzag(_) => match own.winding.neutral() {
            Some(neutral) => ZeroSequence::Path(own.zero + neutral).series(behind),
            None => ZeroSequence::Open,
        },
    };
    inside.through(&Element { positive: own.positive, zero: ZeroAcross::ToEarth(zero), ratio: 1.0 })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::physics::infeed::{Fault, FeederStrength, FeederZero, NetworkFeeder};
    use crate::quantity::Frequency;

    fn kv(n: f64) -> ElectricPotential {
        ElectricPotential::from_si(n * 1e3)
    }

    fn feeder() -> Infeed {
        NetworkFeeder {
            nominal: kv(110.0),
            strength: FeederStrength::Current(ElectricCurrent::from_si(20e3)),
            c: 1.1,
            r_over_x: 0.1,
            zero: FeederZero::Ratios { x0_over_x1: 3.0, r0_over_x0: 0.2 },
        }
        .infeed()
    }

    fn transformer(high_winding: Winding, low_winding: Winding) -> TwoWindingTransformer {
        TwoWindingTransformer {
            rated_power: Power::from_si(31.5e6),
            high: kv(115.0),
            low: kv(10.5),
            impedance_voltage: Ratio::from_si(0.12),
            load_losses: Power::from_si(157.5e3),
            zero: None,
            high_winding,
            low_winding,
        }
    }

    /// Own calculation: xT = 0.11990, KT = 0.95 x 1.1 / 1.07194 = 0.97487, ZT = 0.42 ohm at 10.5 kV; with ZQ = 3.493 ohm (10.5/115)^2
    /// the current at 10 kV is 14.5 kA.
    #[test]
    fn two_windings() {
        let t = transformer(Winding::Delta, Winding::Star(Neutral::Earthed));
        assert!((t.correction(1.1) - 0.97487).abs() < 1e-5);
        let below = feeder().through(&t.downwards(1.1));
        let fault = Fault::new(&below, kv(10.0), 1.1, Frequency::from_si(50.0));
        assert!((fault.three_phase().si() / 1e3 - 14.5).abs() < 0.05, "{:?}", fault.three_phase());
        // Behind a delta winding the zero sequence is that of the transformer alone.
        let ZeroSequence::Path(zero) = below.zero() else { panic!("a path") };
        assert!((zero.magnitude().si() - 0.42 * 0.97487).abs() < 1e-5);
        assert!(fault.single_phase().expect("Z0") > fault.three_phase());
    }

    /// Which connections pass the zero sequence, open it or lead it to earth.
    #[test]
    fn connections() {
        let star = Winding::Star(Neutral::Earthed);
        let ohm = Impedance::new(ElectricalResistance::from_si(100.0), ElectricalResistance::from_si(0.0));
        let zero = |high, low| transformer(high, low).downwards(1.1).zero;
        assert_eq!(zero(star, Winding::Delta), ZeroAcross::ToEarth(ZeroSequence::Open));
        assert_eq!(zero(star, Winding::Star(Neutral::Isolated)), ZeroAcross::ToEarth(ZeroSequence::Open));
        assert_eq!(zero(Winding::Star(Neutral::Isolated), star), ZeroAcross::ToEarth(ZeroSequence::Open));
        assert_eq!(zero(Winding::Unknown, star), ZeroAcross::ToEarth(ZeroSequence::Unknown));
        assert_eq!(zero(Winding::Delta, Winding::Zigzag(Neutral::Earthed)), ZeroAcross::ToEarth(ZeroSequence::Unknown));
        assert!(matches!(zero(star, star), ZeroAcross::Along(ZeroSequence::Path(_))));
        let ZeroAcross::ToEarth(ZeroSequence::Path(z)) = zero(Winding::Delta, Winding::Star(Neutral::Through(ohm)))
        else {
            panic!("a path")
        };
        assert!((z.resistance().si() - 300.0).abs() < 0.1);
    }

    /// Own calculation: with equal pairs every branch is half of a pair, and a delta tertiary gives the zero sequence a path even
    /// where nothing feeds.
    #[test]
    fn three_windings() {
        let pair = PairOfWindings {
            power: Power::from_si(31.5e6),
            impedance_voltage: Ratio::from_si(0.12),
            load_losses: Power::from_si(157.5e3),
        };
        let t = ThreeWindingTransformer {
            voltages: [kv(115.0), kv(10.5), kv(10.5)],
            windings: [Winding::Star(Neutral::Isolated), Winding::Star(Neutral::Earthed), Winding::Delta],
            pairs: [pair; 3],
            zero: None,
        };
        let whole = transformer(Winding::Unknown, Winding::Unknown).downwards(1.1).positive;
        for branch in t.star(kv(10.5), 1.1) {
            assert!((branch.ohms() - whole.ohms() * 0.5).norm() < 1e-9);
        }
        let below = t.seen_from_middle(Some(&feeder()), None, 1.1);
        let expected = feeder().through(&transformer(Winding::Delta, Winding::Delta).downwards(1.1));
        let difference = below.positive().expect("Z1").ohms() - expected.positive().expect("Z1").ohms();
        assert!(difference.norm() < 1e-9);
        // Half of a pair of the own winding and half of one of the tertiary.
        let ZeroSequence::Path(zero) = below.zero() else { panic!("a path") };
        assert!((zero.ohms() - whole.ohms()).norm() < 1e-9);
        assert_eq!(t.seen_from_high(None, Some(&feeder()), 1.1).zero(), ZeroSequence::Open);
        assert_eq!(t.seen_from_low(None, None, 1.1).positive(), None);
    }
}
