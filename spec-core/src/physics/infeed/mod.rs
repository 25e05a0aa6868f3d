//! Sources of short-circuit current, combined to what the connection point sees (IEC 60909-0, from memory and by the public
//! documentation of a general-purpose network library).
//!
//! A source is made by one of the modules below, led through elements towards the connection point, and put in parallel with
//! others. Impedances are in ohm at the voltage of the side they are seen from; nothing is per unit.

mod decay;
mod fault;
mod impedance;
mod machine;
mod network;
mod transformer;

pub use decay::{asynchronous_decay_factor, synchronous_decay_factor};
pub use fault::{EQUIVALENT_SHARE, Fault, PeakMethod, steady_heat};
pub use impedance::{Impedance, ZeroSequence};
pub use machine::{
    AsynchronousMotors, PowerStationUnit, SynchronousGenerator, TapChanger, generator_correction,
    unit_correction_off_load, unit_correction_on_load,
};
pub use network::{ConverterPlant, FeederStrength, FeederZero, NetworkFeeder, PassiveElement, series_reactor};
pub use transformer::{
    Neutral, PairOfWindings, ThreeWindingTransformer, TwoWindingTransformer, Winding, transformer_correction,
};

use num_complex::Complex64;

use crate::quantity::{ElectricCurrent, Physical, Power};

/// What an element between a source and the connection point does to the zero sequence.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum ZeroAcross {
    /// Zero-sequence current passes through this impedance.
    Along(ZeroSequence),
    /// The source is cut off; the far side sees this to earth.
    ToEarth(ZeroSequence),
}

/// An element between a source and the connection point, seen from the far side (that of the connection point).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Element {
    /// The positive-sequence impedance, correction included.
    pub positive: Impedance,
    /// The zero sequence.
    pub zero: ZeroAcross,
    /// Voltage of the far side over that of the source's side: the ratio of the rated voltages of a transformer, else 1.
    pub ratio: f64,
}

/// How the resistance of generators and the frequency enter an impedance.
#[derive(Clone, Copy, Debug, PartialEq)]
struct View {
    /// With the fictitious resistance of generators, for the peak current.
    peak: bool,
    /// Share of the network's frequency.
    share: f64,
}

impl View {
    const INITIAL: Self = Self { peak: false, share: 1.0 };
}

/// The positive-sequence network behind a point.
#[derive(Clone, Debug, PartialEq)]
enum Network {
    /// No voltage source: a converter plant alone.
    Nothing,
    Source {
        initial: Impedance,
        peak: Impedance,
    },
    Behind {
        network: Box<Self>,
        element: Impedance,
        ratio: f64,
    },
    Parallel(Box<Self>, Box<Self>),
    Equal {
        network: Box<Self>,
        number: f64,
    },
}

impl Network {
    fn seen(&self, view: View) -> Option<Impedance> {
        match self {
            Self::Nothing => None,
            Self::Source { initial, peak } => {
                Some((if view.peak { *peak } else { *initial }).at_share_of_frequency(view.share))
            }
            Self::Behind { network, element, ratio } => {
                Some(network.seen(view)?.scaled(ratio * ratio) + element.at_share_of_frequency(view.share))
            }
            Self::Parallel(a, b) => match (a.seen(view), b.seen(view)) {
                (Some(a), Some(b)) => Some(a.parallel(b)),
                (a, b) => a.or(b),
            },
            Self::Equal { network, number } => Some(network.seen(view)?.scaled(1.0 / number)),
        }
    }

    fn is_one_branch(&self) -> bool {
        match self {
            Self::Source { .. } => true,
            Self::Nothing | Self::Parallel(..) => false,
            Self::Behind { network, .. } | Self::Equal { network, .. } => network.is_one_branch(),
        }
    }

    /// R/X of the branches, least and greatest; a chain counts as one branch.
    fn ratios(&self, view: View) -> Option<(f64, f64)> {
        let join = |a: (f64, f64), b: (f64, f64)| (a.0.min(b.0), a.1.max(b.1));
        if self.is_one_branch() {
            let ratio = self.seen(view)?.r_over_x();
            return Some((ratio, ratio));
        }
        match self {
            Self::Behind { network, element, .. } => {
                let own = element.r_over_x();
                network.ratios(view).map(|behind| join(behind, (own, own)))
            }
            Self::Equal { network, .. } => network.ratios(view),
            Self::Parallel(a, b) => match (a.ratios(view), b.ratios(view)) {
                (Some(a), Some(b)) => Some(join(a, b)),
                (a, b) => a.or(b),
            },
            Self::Nothing | Self::Source { .. } => None,
        }
    }
}

/// A rotating machine among the sources, for the decay of the current.
#[derive(Clone, Copy, Debug, PartialEq)]
struct Machine {
    /// Its rated current, referred to the point.
    rated: ElectricCurrent,
    /// Its part of the current of the voltage sources at the point.
    share: Complex64,
    /// Its own reactance with its correction, without resistance and unit transformer, referred to the point.
    own: Impedance,
    /// Rated power a pole pair, of asynchronous motors.
    power_a_pole_pair: Option<Power>,
    /// Whether others feed through the same element, so that its own voltage drop decides.
    meshed: bool,
}

/// Sources as seen from one point.
#[derive(Clone, Debug, PartialEq)]
pub struct Infeed {
    network: Network,
    zero: ZeroSequence,
    converter: ElectricCurrent,
    machines: Vec<Machine>,
}

impl Infeed {
    /// A source known by its positive- and zero-sequence impedance at the point: "plain impedance". No decay.
    pub fn of_impedance(positive: Impedance, zero: ZeroSequence) -> Self {
        Self::of_source(positive, positive, zero, Vec::new())
    }

    fn of_source(initial: Impedance, peak: Impedance, zero: ZeroSequence, machines: Vec<Machine>) -> Self {
        let converter = ElectricCurrent::from_si(0.0);
        Self { network: Network::Source { initial, peak }, zero, converter, machines }
    }

    /// A converter plant: a source of current without an impedance.
    fn of_current(current: ElectricCurrent) -> Self {
        Self { network: Network::Nothing, zero: ZeroSequence::Open, converter: current, machines: Vec::new() }
    }

    /// Z1 at the point, correction factors included; none where there are converter plants only.
    pub fn positive(&self) -> Option<Impedance> {
        self.network.seen(View::INITIAL)
    }

    /// Z1 at the point with the reactances that it has at a share of the frequency.
    pub fn positive_at(&self, share: f64) -> Option<Impedance> {
        self.network.seen(View { peak: false, share })
    }

    /// Whether one chain of elements feeds the point, so that R/X is the same at any frequency.
    pub fn is_one_branch(&self) -> bool {
        self.network.is_one_branch()
    }

    /// Whether machines whose current decays are among the sources.
    pub fn has_machines(&self) -> bool {
        !self.machines.is_empty()
    }

    /// Z1 at the point as the peak current has it: with the fictitious resistance of generators, at a share of the frequency.
    pub fn positive_for_peak(&self, share: f64) -> Option<Impedance> {
        self.network.seen(View { peak: true, share })
    }

    /// Z0 at the point.
    pub fn zero(&self) -> ZeroSequence {
        self.zero
    }

    /// The current that converter plants give to a three-phase fault at the point.
    pub fn converter_current(&self) -> ElectricCurrent {
        self.converter
    }

    /// As seen from the far side of an element ("through").
    ///
    /// A converter's current divides between the element and the voltage sources beside the converter. IEC 60909-0:2016, clause
    /// on power station units with full-size converters, from memory.
    #[must_use]
    pub fn through(&self, element: &Element) -> Self {
        let square = element.ratio * element.ratio;
        let behind = self.positive().map(|z| z.scaled(square));
        let passes = behind.map_or(1.0, |z| (z.magnitude() / (z + element.positive).magnitude()).value);
        let network = match &self.network {
            Network::Nothing => Network::Nothing,
            network => {
                Network::Behind { network: Box::new(network.clone()), element: element.positive, ratio: element.ratio }
            }
        };
        let meshed = !self.network.is_one_branch();
        let machines = self.machines.iter().map(|machine| Machine {
            rated: machine.rated / element.ratio,
            own: machine.own.scaled(square),
            meshed: machine.meshed || meshed,
            ..*machine
        });
        let zero = match element.zero {
            ZeroAcross::Along(own) => self.zero.scaled(square).series(own),
            ZeroAcross::ToEarth(own) => own,
        };
        Self { network, zero, converter: self.converter * (passes / element.ratio), machines: machines.collect() }
    }

    /// As seen from the far side of several elements side by side, all fed by this. Their ratios should be one; where they differ, no
    /// current that circulates between them is counted, and the least is taken, which gives the greatest fault current. None without
    /// elements.
    pub fn through_all(&self, elements: &[Element]) -> Option<Self> {
        let positive = elements.iter().map(|element| element.positive).reduce(Impedance::parallel)?;
        let ratio = elements.iter().map(|element| element.ratio).reduce(f64::min)?;
        let beside = |zero: ZeroSequence, next: ZeroSequence| zero.parallel(next);
        let along = elements.iter().map(|element| match element.zero {
            ZeroAcross::Along(own) => own,
            ZeroAcross::ToEarth(_) => ZeroSequence::Open,
        });
        let to_earth = elements.iter().map(|element| match element.zero {
            ZeroAcross::ToEarth(own) => own,
            ZeroAcross::Along(_) => ZeroSequence::Open,
        });
        let along = along.fold(ZeroSequence::Open, beside);
        let source = self.zero.scaled(ratio * ratio).series(along);
        let zero = to_earth.fold(source, beside);
        Some(self.through(&Element { positive, zero: ZeroAcross::ToEarth(zero), ratio }))
    }

    /// Beside another at the same point.
    #[must_use]
    pub fn parallel(&self, other: &Self) -> Self {
        let network = match (&self.network, &other.network) {
            (Network::Nothing, network) | (network, Network::Nothing) => network.clone(),
            (a, b) => Network::Parallel(Box::new(a.clone()), Box::new(b.clone())),
        };
        let all = network.seen(View::INITIAL);
        let shared = |infeed: &Self| {
            let part = match (all, infeed.positive()) {
                (Some(all), Some(own)) => all.ohms() / own.ohms(),
                _ => Complex64::new(0.0, 0.0),
            };
            infeed
                .machines
                .iter()
                .map(move |machine| Machine { share: machine.share * part, ..*machine })
                .collect::<Vec<_>>()
        };
        Self {
            machines: [shared(self), shared(other)].concat(),
            zero: self.zero.parallel(other.zero),
            converter: self.converter + other.converter,
            network,
        }
    }

    /// All of them side by side; none of an empty list.
    pub fn all_in_parallel<'a>(infeeds: impl IntoIterator<Item = &'a Self>) -> Option<Self> {
        infeeds.into_iter().fold(None, |all: Option<Self>, infeed| {
            Some(all.map_or_else(|| infeed.clone(), |all| all.parallel(infeed)))
        })
    }

    /// `number` equal ones side by side; zero counts as one.
    #[must_use]
    pub fn times(&self, number: u32) -> Self {
        let number = f64::from(number.max(1));
        let network = match &self.network {
            Network::Nothing => Network::Nothing,
            network => Network::Equal { network: Box::new(network.clone()), number },
        };
        let machines = self.machines.iter().map(|machine| Machine {
            rated: machine.rated * number,
            own: machine.own.scaled(1.0 / number),
            ..*machine
        });
        Self {
            network,
            zero: self.zero.scaled(1.0 / number),
            converter: self.converter * number,
            machines: machines.collect(),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::quantity::{ElectricPotential, ElectricalResistance, Frequency};

    fn z(r: f64, x: f64) -> Impedance {
        Impedance::new(ElectricalResistance::from_si(r), ElectricalResistance::from_si(x))
    }

    fn path(r: f64, x: f64) -> ZeroSequence {
        ZeroSequence::Path(z(r, x))
    }

    fn line(r: f64, x: f64) -> Element {
        Element { positive: z(r, x), zero: ZeroAcross::Along(path(3.0 * r, 3.0 * x)), ratio: 1.0 }
    }

    /// Own calculation: 1 ohm through 1 ohm beside 2 ohm is 1 ohm; a quarter of it behind a ratio of one to two.
    #[test]
    fn series_parallel_and_ratio() {
        let one = Infeed::of_impedance(z(0.0, 1.0), path(0.0, 1.0)).through(&line(0.0, 1.0));
        let both = one.parallel(&Infeed::of_impedance(z(0.0, 2.0), path(0.0, 4.0)));
        assert_eq!(both.positive(), Some(z(0.0, 1.0)));
        assert_eq!(both.zero(), path(0.0, 2.0));
        let down = Element { positive: z(0.0, 0.5), zero: ZeroAcross::ToEarth(path(0.0, 0.5)), ratio: 0.5 };
        let below = both.through(&down);
        assert_eq!(below.positive(), Some(z(0.0, 0.75)));
        assert_eq!(below.zero(), path(0.0, 0.5));
        assert_eq!(one.times(2).positive(), Some(z(0.0, 1.0)));
    }

    /// Own calculation: 1 ohm behind two of 2 ohm side by side is 2 ohm, and not the 1.5 ohm of the source counted twice; the zero
    /// sequence passes one and ends in the other.
    #[test]
    fn elements_side_by_side_share_their_source() {
        let source = Infeed::of_impedance(z(0.0, 1.0), path(0.0, 1.0));
        let passes = Element { positive: z(0.0, 2.0), zero: ZeroAcross::Along(path(0.0, 2.0)), ratio: 1.0 };
        let ends = Element { positive: z(0.0, 2.0), zero: ZeroAcross::ToEarth(path(0.0, 3.0)), ratio: 1.0 };
        let both = source.through_all(&[passes, passes]).expect("elements");
        assert_eq!((both.positive(), both.zero()), (Some(z(0.0, 2.0)), path(0.0, 2.0)));
        let mixed = source.through_all(&[passes, ends]).expect("elements");
        assert_eq!((mixed.positive(), mixed.zero()), (Some(z(0.0, 2.0)), path(0.0, 1.5)));
        let one = source.through_all(&[ends]).expect("an element");
        assert_eq!((one.positive(), one.zero()), (Some(z(0.0, 3.0)), path(0.0, 3.0)));
        assert_eq!(source.through_all(&[]), None);
    }

    /// Own calculation: 100 A of a converter beside 1 ohm, through 1 ohm, leave 50 A; the fault current is the sum of magnitudes.
    #[test]
    fn a_converter_adds_by_magnitude() {
        let plant = Infeed::of_current(ElectricCurrent::from_si(100.0));
        let beside = plant.parallel(&Infeed::of_impedance(z(0.0, 1.0), ZeroSequence::Unknown)).through(&line(0.0, 1.0));
        assert!((beside.converter_current().si() - 50.0).abs() < 1e-9);
        let alone = plant.through(&line(0.0, 1.0));
        assert_eq!(alone.converter_current(), plant.converter_current());
        assert_eq!(alone.positive(), None);
        let fault = Fault::new(&beside, ElectricPotential::from_si(20e3), 1.1, Frequency::from_si(50.0));
        assert!((fault.three_phase().si() - (1.1 * 20e3 / 3f64.sqrt() / 2.0 + 50.0)).abs() < 1e-6);
    }
}
