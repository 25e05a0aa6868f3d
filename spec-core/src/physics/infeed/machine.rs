//! Synchronous generators, power station units and asynchronous motors (IEC 60909-0).

use num_complex::Complex64;

use super::{Element, Impedance, Infeed, Machine, TwoWindingTransformer, ZeroSequence};
use crate::quantity::{ElectricCurrent, ElectricPotential, ElectricalResistance, Physical, Power, Ratio};
use crate::standards::{generator_r_over_x, motor_r_over_x};

/// A synchronous generator.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SynchronousGenerator {
    /// Rated voltage, phase to phase, rms.
    pub rated_voltage: ElectricPotential,
    /// Rated apparent power.
    pub rated_power: Power,
    /// Saturated subtransient reactance, as a share of the rated impedance.
    pub subtransient: Ratio,
    /// Resistance of the stator; absent: the fictitious one by the table of machines.
    pub resistance: Option<ElectricalResistance>,
    /// Rated power factor.
    pub power_factor: f64,
    /// How far its voltage may lie above the rated one for long, pG.
    pub voltage_range: Ratio,
    /// Its zero-sequence impedance with that of its neutral (three times), where a path exists and is known.
    pub zero: ZeroSequence,
}

/// KG = (Un / (UrG (1 + pG))) cmax / (1 + xd'' sin phi). IEC 60909-0, equation for KG (the direction Un/UrG from memory).
pub fn generator_correction(nominal: ElectricPotential, generator: &SynchronousGenerator, c_max: f64) -> f64 {
    (nominal / generator.highest_voltage()).value * generator.voltage_behind(c_max)
}

/// KS = (UnQ^2/UrG^2) (UrTLV^2/UrTHV^2) cmax / (1 + |xd'' - xT| sin phi), of a unit whose transformer has an on-load tap changer.
/// IEC 60909-0, equation for KS.
pub fn unit_correction_on_load(
    nominal: ElectricPotential,
    generator: &SynchronousGenerator,
    transformer: &TwoWindingTransformer,
    c_max: f64,
) -> f64 {
    let voltages = (nominal / generator.highest_voltage() * (transformer.low / transformer.high)).value;
    let difference = (generator.subtransient.si() - transformer.relative_reactance()).abs();
    voltages * voltages * c_max / (1.0 + difference * generator.sin_phi())
}

/// KSO = (UnQ / (UrG (1 + pG))) (UrTLV/UrTHV) (1 - pT) cmax / (1 + xd'' sin phi), of a unit without on-load tap changer; pT
/// the permanent off-load tap towards less impedance, else zero. IEC 60909-0, equation for KSO.
pub fn unit_correction_off_load(
    nominal: ElectricPotential,
    generator: &SynchronousGenerator,
    transformer: &TwoWindingTransformer,
    off_load_tap: Ratio,
    c_max: f64,
) -> f64 {
    let voltages = (nominal / generator.highest_voltage() * (transformer.low / transformer.high)).value;
    voltages * (1.0 - off_load_tap.si()) * generator.voltage_behind(c_max)
}

impl SynchronousGenerator {
    /// Rated current, A.
    pub fn rated_current(&self) -> ElectricCurrent {
        self.rated_power / (self.rated_voltage * 3f64.sqrt())
    }

    fn highest_voltage(&self) -> ElectricPotential {
        self.rated_voltage * (1.0 + self.voltage_range.si())
    }

    fn sin_phi(&self) -> f64 {
        (1.0 - self.power_factor * self.power_factor).max(0.0).sqrt()
    }

    /// cmax / (1 + xd'' sin phi).
    fn voltage_behind(&self, c_max: f64) -> f64 {
        c_max / (1.0 + self.subtransient.si() * self.sin_phi())
    }

    /// Uncorrected, with its true resistance and with the fictitious one.
    fn impedances(&self) -> (Impedance, Impedance) {
        let reactance: ElectricalResistance =
            self.rated_voltage * self.rated_voltage * self.subtransient / self.rated_power;
        let fictitious = generator_r_over_x(self.rated_voltage, self.rated_power).map(|ratio| reactance * ratio);
        let fictitious = fictitious.or(self.resistance).unwrap_or_default();
        (Impedance::new(self.resistance.unwrap_or(fictitious), reactance), Impedance::new(fictitious, reactance))
    }

    fn corrected(&self, factor: f64) -> Infeed {
        let (initial, peak) = self.impedances();
        let machine = Machine::alone(self.rated_current(), initial.scaled(factor), None);
        Infeed::of_source(initial.scaled(factor), peak.scaled(factor), self.zero, vec![machine])
    }

    /// ZGK = KG (RG + jXd''), connected without a unit transformer to a network of a nominal voltage. Ohm at its terminals.
    /// IEC 60909-0, clause on synchronous generators.
    pub fn infeed(&self, nominal: ElectricPotential, c_max: f64) -> Infeed {
        self.corrected(generator_correction(nominal, self, c_max))
    }
}

/// Whether the transformer of a unit has an on-load tap changer.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum TapChanger {
    /// It has.
    OnLoad,
    /// It has not; the share is the permanent off-load tap pT, zero where none is in use.
    OffLoad(Ratio),
}

/// A generator with its unit transformer.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PowerStationUnit {
    /// The generator.
    pub generator: SynchronousGenerator,
    /// The transformer.
    pub transformer: TwoWindingTransformer,
    /// Its tap changer.
    pub tap_changer: TapChanger,
}

impl PowerStationUnit {
    /// KS or KSO at a nominal voltage of the network.
    pub fn correction(&self, nominal: ElectricPotential, c_max: f64) -> f64 {
        match self.tap_changer {
            TapChanger::OnLoad => unit_correction_on_load(nominal, &self.generator, &self.transformer, c_max),
            TapChanger::OffLoad(tap) => {
                unit_correction_off_load(nominal, &self.generator, &self.transformer, tap, c_max)
            }
        }
    }

    /// Seen from the high-voltage side: ZS = KS (tr^2 ZG + ZTHV), Z0S = KS Z0THV + 3 ZN. Ohm at the high-voltage side.
    /// IEC 60909-0, clause on power station units.
    pub fn infeed(&self, nominal: ElectricPotential, c_max: f64) -> Infeed {
        let factor = self.correction(nominal, c_max);
        let transformer = self.transformer.upwards_corrected(factor);
        self.generator.corrected(factor).through(&transformer)
    }

    /// The generator's part of a fault between it and the unit transformer: ZG cmax / (1 + xd'' sin phi), without on-load tap
    /// changer also over 1 + pG. Ohm at its terminals; the fault is calculated with c UrG. IEC 60909-0, clause on faults inside
    /// power station units.
    pub fn generator_inside(&self, c_max: f64) -> Infeed {
        let factor = self.generator.voltage_behind(c_max);
        self.generator.corrected(match self.tap_changer {
            TapChanger::OnLoad => factor,
            TapChanger::OffLoad(_) => factor / (1.0 + self.generator.voltage_range.si()),
        })
    }

    /// The network's part of such a fault: the network at the high-voltage side through the uncorrected transformer. Ohm at the
    /// generator's terminals. IEC 60909-0, clause on faults inside power station units.
    pub fn network_inside(&self, network: &Infeed) -> Infeed {
        network.through(&self.transformer.downwards_corrected(1.0))
    }
}

/// A group of equal asynchronous motors, or one.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct AsynchronousMotors {
    /// Rated voltage, phase to phase, rms.
    pub rated_voltage: ElectricPotential,
    /// Rated mechanical power of all of them.
    pub rated_power: Power,
    /// Rated power factor.
    pub power_factor: f64,
    /// Rated efficiency.
    pub efficiency: Ratio,
    /// Starting over rated current.
    pub starting_ratio: f64,
    /// Rated mechanical power of one of them over its pole pairs; absent: no decay is counted, and R/X is that of the greater ones.
    pub power_a_pole_pair: Option<Power>,
    /// R/X; absent: by the table of machines.
    pub r_over_x: Option<f64>,
}

impl AsynchronousMotors {
    /// Rated current, A.
    pub fn rated_current(&self) -> ElectricCurrent {
        self.rated_power / (self.rated_voltage * (3f64.sqrt() * self.power_factor * self.efficiency.si()))
    }

    /// ZM = UrM / (sqrt3 IrM (ILR/IrM)). Ohm at their terminals; no zero sequence, for their neutral is not earthed.
    /// IEC 60909-0, clause on asynchronous motors.
    pub fn infeed(&self) -> Infeed {
        let magnitude: ElectricalResistance =
            self.rated_voltage / (self.rated_current() * (3f64.sqrt() * self.starting_ratio));
        let power = self.power_a_pole_pair.unwrap_or(self.rated_power);
        let ratio = self.r_over_x.or_else(|| motor_r_over_x(self.rated_voltage, power)).unwrap_or_default();
        let own = Impedance::of_magnitude(magnitude, ratio);
        let decays = self.power_a_pole_pair.map(|power| Machine::alone(self.rated_current(), own, Some(power)));
        Infeed::of_source(own, own, ZeroSequence::Open, decays.into_iter().collect())
    }
}

impl Machine {
    /// At its own terminals.
    fn alone(rated: ElectricCurrent, impedance: Impedance, power_a_pole_pair: Option<Power>) -> Self {
        let own = Impedance::new(ElectricalResistance::default(), impedance.reactance());
        Self { rated, share: Complex64::new(1.0, 0.0), own, power_a_pole_pair, meshed: false }
    }
}

impl TwoWindingTransformer {
    /// From the low- to the high-voltage side with any correction factor; three times the neutral's impedance stays uncorrected.
    pub(super) fn upwards_corrected(&self, factor: f64) -> Element {
        self.across(self.high, self.low, &self.high_winding, &self.low_winding, factor)
    }

    /// From the high- to the low-voltage side.
    pub(super) fn downwards_corrected(&self, factor: f64) -> Element {
        self.across(self.low, self.high, &self.low_winding, &self.high_winding, factor)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::physics::infeed::{Fault, Neutral, PeakMethod, Winding};
    use crate::quantity::{Frequency, Time};

    fn kv(n: f64) -> ElectricPotential {
        ElectricPotential::from_si(n * 1e3)
    }

    fn unit() -> PowerStationUnit {
        let generator = SynchronousGenerator {
            rated_voltage: kv(10.5),
            rated_power: Power::from_si(100e6),
            subtransient: Ratio::from_si(0.16),
            resistance: Some(ElectricalResistance::from_si(0.005)),
            power_factor: 0.9,
            voltage_range: Ratio::from_si(0.075),
            zero: ZeroSequence::Open,
        };
        let transformer = TwoWindingTransformer {
            rated_power: Power::from_si(100e6),
            high: kv(120.0),
            low: kv(10.5),
            impedance_voltage: Ratio::from_si(0.12),
            load_losses: Power::from_si(0.5e6),
            zero: None,
            high_winding: Winding::Star(Neutral::Isolated),
            low_winding: Winding::Delta,
        };
        PowerStationUnit { generator, transformer, tap_changer: TapChanger::OffLoad(Ratio::from_si(0.0)) }
    }

    /// Tests of pandapower (lists of another program): 1.9755 and 39.5042 kA, peaks 5.2316 and 104.1085 kA, breaking currents after
    /// 0.1 s 1.6071 and 27.3470 kA, of one unit alone at 110 kV and at its generator. The lists are cut, not rounded.
    #[test]
    fn one_unit() {
        let unit = unit();
        let (high, low) = (unit.infeed(kv(110.0), 1.1), unit.generator_inside(1.1));
        for (infeed, voltage, ik, ip, ib) in
            [(&high, 110.0, 1.9755, 5.2316, 1.6071), (&low, 10.5, 39.5042, 104.1085, 27.3470)]
        {
            let fault = Fault::new(infeed, kv(voltage), 1.1, Frequency::from_si(50.0));
            assert!((fault.three_phase().si() / 1e3 - ik).abs() < 1e-4, "{:?}", fault.three_phase());
            let peak = fault.peak(PeakMethod::EquivalentFrequency);
            assert!((peak.si() / 1e3 - ip).abs() < 1e-4 * ip, "{peak:?}");
            let breaking = fault.breaking(Time::from_si(0.1));
            assert!((breaking.si() / 1e3 - ib).abs() < 1e-4 * ib.max(1.0), "{breaking:?}");
        }
        let inside = unit.network_inside(&high);
        assert_eq!(inside.zero(), ZeroSequence::Open);
    }

    /// Own calculation: 5 MW, 0.88, 97.5 %, 5 times, 10 kV: IrM 336.4 A, ZM 3.432 ohm.
    #[test]
    fn motors() {
        let motors = AsynchronousMotors {
            rated_voltage: kv(10.0),
            rated_power: Power::from_si(5e6),
            power_factor: 0.88,
            efficiency: Ratio::from_si(0.975),
            starting_ratio: 5.0,
            power_a_pole_pair: None,
            r_over_x: None,
        };
        assert!((motors.rated_current().si() - 336.45).abs() < 0.01);
        let z = motors.infeed().positive().expect("Z1");
        assert!((z.magnitude().si() - 3.432).abs() < 1e-3);
        assert!((z.r_over_x() - 0.1).abs() < 1e-12);
    }
}
