//! Sources of current: networks, generators, motors, converters, and systems that stand behind a transformer.

use super::read::{At, Reader, Source};
use super::{Off, at_system, nominal_of, number};
use crate::particular::{infeed, system};
use crate::physics::infeed::{
    AsynchronousMotors, ConverterPlant, FeederStrength, FeederZero, Impedance, Infeed, NetworkFeeder, Neutral,
    SynchronousGenerator, ZeroSequence,
};
use crate::physics::short_circuit;
use crate::quantity::{
    Dimension, ElectricCurrent, ElectricPotential, ElectricalResistance, Physical, Power, Ratio, Time,
};

impl<'a> Reader<'a> {
    pub(super) fn network(&mut self, source: &Source<'a>, at: At) -> Option<Infeed> {
        let level = source.facts.quantity::<Power>(&infeed::FAULT_LEVEL).filter(|s| s.value.si() > 0.0);
        let at_voltage = level.as_ref().and_then(|s| s.statement.quantity()?.at?.to::<ElectricPotential>());
        let current = source.positive::<ElectricCurrent>(&infeed::SHORT_CIRCUIT_CURRENT);
        let stated = source.positive::<ElectricPotential>(&infeed::NOMINAL_VOLTAGE);
        // At the system itself its nominal voltage is that of the system.
        let nominal = stated.or(at_voltage).or(at.nominal);
        let ratio = source
            .number(&infeed::R_OVER_X)
            .or_else(|| source.number(&infeed::X_OVER_R).filter(|ratio| *ratio > 0.0).map(f64::recip));
        let ratio = ratio.filter(|ratio| *ratio >= 0.0 && ratio.is_finite());
        let strength =
            current.map(FeederStrength::Current).or_else(|| level.as_ref().map(|s| FeederStrength::Level(s.value)));
        let (Some(strength), Some(nominal), Some(r_over_x)) = (strength, nominal, ratio) else {
            if strength.is_none() && !source.facts.mentions(&infeed::FAULT_LEVEL) {
                self.lacks(source, Off::Everything, &[&infeed::SHORT_CIRCUIT_CURRENT]);
            }
            if nominal.is_none() {
                self.lacks(source, Off::Everything, &[&infeed::NOMINAL_VOLTAGE]);
            }
            if ratio.is_none() && !source.facts.mentions(&infeed::R_OVER_X) {
                self.lacks(source, Off::Everything, &[&infeed::X_OVER_R]);
            }
            return None;
        };
        if !self.stands_right(source, &infeed::NOMINAL_VOLTAGE, at) {
            return None;
        }
        let c = source.number(&infeed::VOLTAGE_FACTOR).filter(|c| *c > 0.0);
        let feeder = NetworkFeeder {
            nominal,
            strength,
            c: c.or(at.c).unwrap_or_else(|| super::c_max(nominal)),
            r_over_x,
            zero: FeederZero::Unknown,
        };
        let many = number(source.facts);
        let single = source.positive::<ElectricCurrent>(&infeed::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT);
        let infeed = match single {
            Some(current) => NetworkFeeder { zero: FeederZero::SinglePhase(current), ..feeder }.infeed(),
            None => {
                let plain = feeder.infeed();
                let positive = plain.positive()?;
                let zero = self.stated_zero(source, positive, 1.0);
                Infeed::of_impedance(positive, zero)
            }
        };
        let infeed = infeed.times(many);
        self.part(source, at, infeed.positive()?);
        Some(infeed)
    }

    /// Another system as a source: its stated level, else its own infeeds.
    pub(super) fn whole_system(&mut self, source: &Source<'a>, at: At) -> Option<Infeed> {
        let Some((nominal, c)) = nominal_of(source.facts) else {
            self.lacks(source, Off::Everything, &[&system::NOMINAL_VOLTAGE]);
            return None;
        };
        if !self.stands_right(source, &system::NOMINAL_VOLTAGE, at) {
            return None;
        }
        let level = source.facts.quantity::<Power>(&system::FAULT_LEVEL).filter(|s| s.value.si() > 0.0);
        let of_level = level.as_ref().and_then(|level| {
            let voltage = level.statement.quantity()?.at?.to::<ElectricPotential>()?;
            Some(short_circuit::current_of_fault_level(level.value, voltage))
        });
        let current = source.positive::<ElectricCurrent>(&system::SHORT_CIRCUIT_CURRENT).or(of_level);
        let Some(current) = current else {
            let ids: Vec<_> = at_system(self.set, source.sheet.id).collect();
            if ids.is_empty() {
                self.lacks(source, Off::Everything, &[&system::SHORT_CIRCUIT_CURRENT]);
                return None;
            }
            let there = At { voltage: nominal, nominal: Some(nominal), c: Some(c), busbar: false, ..at };
            return self.together(&ids, there);
        };
        let Some(r_over_x) = self.ratio_of_system(source) else {
            self.lacks(source, Off::Everything, &[&system::X_OVER_R]);
            return None;
        };
        let strength = FeederStrength::Current(current);
        let single = source.positive::<ElectricCurrent>(&system::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT);
        let ratios = (source.number(&system::X0_OVER_X1), source.number(&system::R0_OVER_X1));
        let zero = match (single, ratios) {
            (Some(current), _) => FeederZero::SinglePhase(current),
            (None, (Some(x0), Some(r0))) if x0 > 0.0 => FeederZero::Ratios { x0_over_x1: x0, r0_over_x0: r0 / x0 },
            _ => FeederZero::Unknown,
        };
        let mut infeed = NetworkFeeder { nominal, strength, c, r_over_x, zero }.infeed();
        let isolated =
            source.facts.word(&system::NEUTRAL).is_some_and(|(w, _)| matches!(w, "isolated" | "resonant earthed"));
        match infeed.zero() {
            ZeroSequence::Unknown if isolated => infeed = Infeed::of_impedance(infeed.positive()?, ZeroSequence::Open),
            ZeroSequence::Unknown => self.lacks(source, Off::Earth, &[&system::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT]),
            _ => {}
        }
        self.part(source, at, infeed.positive()?);
        Some(infeed)
    }

    /// R/X of a system: by X/R, R/X or the time constant.
    fn ratio_of_system(&self, source: &Source<'a>) -> Option<f64> {
        let of_x = source.number(&system::X_OVER_R).filter(|x| *x > 0.0).map(f64::recip);
        of_x.or_else(|| source.number(&system::R_OVER_X).filter(|r| *r >= 0.0)).or_else(|| {
            let tau = source.positive::<Time>(&system::DC_TIME_CONSTANT)?;
            Some(short_circuit::x_over_r(tau, self.frequency?).recip())
        })
    }

    /// The data of a generator at a place; the transformer of a unit hides its zero sequence.
    pub(super) fn generator_of(&mut self, source: &Source<'a>, in_unit: bool) -> Option<SynchronousGenerator> {
        let needed =
            [&infeed::RATED_VOLTAGE, &infeed::RATED_POWER, &infeed::SUBTRANSIENT_REACTANCE, &infeed::POWER_FACTOR];
        let values = (
            source.positive::<ElectricPotential>(&infeed::RATED_VOLTAGE),
            source.positive::<Power>(&infeed::RATED_POWER),
            source.positive::<Ratio>(&infeed::SUBTRANSIENT_REACTANCE),
            source.number(&infeed::POWER_FACTOR).filter(|cos| *cos > 0.0 && *cos <= 1.0),
        );
        let (Some(rated_voltage), Some(power), Some(subtransient), Some(power_factor)) = values else {
            self.lacks(source, Off::Everything, &needed);
            return None;
        };
        // A power in MW is the active one.
        let stated = source.facts.quantity::<Power>(&infeed::RATED_POWER);
        let active = stated.is_some_and(|s| s.measure.dimension() == Dimension::ActivePower);
        let rated_power = if active { power / power_factor } else { power };
        let base: ElectricalResistance = rated_voltage * rated_voltage / rated_power;
        let resistance = source
            .quantity::<ElectricalResistance>(&infeed::ARMATURE_RESISTANCE)
            .or_else(|| source.quantity::<Ratio>(&infeed::ARMATURE_RESISTANCE).map(|share| base * share));
        if resistance.is_none() {
            self.lacks(source, Off::DirectCurrent, &[&infeed::ARMATURE_RESISTANCE]);
        }
        let zero = if in_unit { ZeroSequence::Open } else { self.zero_of_generator(source) };
        Some(SynchronousGenerator {
            rated_voltage,
            rated_power,
            subtransient,
            resistance,
            power_factor,
            voltage_range: source.quantity::<Ratio>(&infeed::VOLTAGE_RANGE).unwrap_or_default(),
            zero,
        })
    }

    fn zero_of_generator(&mut self, source: &Source<'a>) -> ZeroSequence {
        let neutral = super::windings::neutral(source.facts, &infeed::NEUTRAL, Some(&infeed::NEUTRAL_IMPEDANCE));
        let through = match neutral {
            Ok(Some(Neutral::Isolated)) => return ZeroSequence::Open,
            Ok(Some(Neutral::Earthed)) => {
                Impedance::new(ElectricalResistance::default(), ElectricalResistance::default())
            }
            Ok(Some(Neutral::Through(z))) => z.scaled(3.0),
            Ok(None) => {
                self.lacks(source, Off::Earth, &[&infeed::NEUTRAL]);
                return ZeroSequence::Unknown;
            }
            Err(needed) => {
                self.lacks_words(source, Off::Earth, vec![needed.to_owned()]);
                return ZeroSequence::Unknown;
            }
        };
        let Some(reactance) = source.quantity::<ElectricalResistance>(&infeed::ZERO_SEQUENCE_REACTANCE) else {
            self.lacks(source, Off::Earth, &[&infeed::ZERO_SEQUENCE_REACTANCE]);
            return ZeroSequence::Unknown;
        };
        let resistance = source.quantity::<ElectricalResistance>(&infeed::ZERO_SEQUENCE_RESISTANCE).unwrap_or_default();
        ZeroSequence::Path(Impedance::new(resistance, reactance) + through)
    }

    pub(super) fn generator(&mut self, source: &Source<'a>, at: At) -> Option<Infeed> {
        let generator = self.generator_of(source, false)?;
        if !self.stands_right(source, &infeed::RATED_VOLTAGE, at) {
            return None;
        }
        let nominal = source.positive::<ElectricPotential>(&infeed::NOMINAL_VOLTAGE).or(at.nominal);
        let Some(nominal) = nominal else {
            self.lacks(source, Off::Everything, &[&infeed::NOMINAL_VOLTAGE]);
            return None;
        };
        let c = at.c.unwrap_or_else(|| super::c_max(nominal));
        let infeed = generator.infeed(nominal, c).times(number(source.facts));
        self.part(source, at, infeed.positive()?);
        self.note_reactance(source, at, infeed.positive()?);
        Some(infeed)
    }

    pub(super) fn motors(&mut self, source: &Source<'a>, at: At) -> Option<Infeed> {
        let voltage = source.positive::<ElectricPotential>(&infeed::RATED_VOLTAGE);
        let power = source.facts.quantity::<Power>(&infeed::RATED_POWER).filter(|s| s.value.si() > 0.0);
        let starting_ratio = source.number(&infeed::STARTING_CURRENT_RATIO).filter(|ratio| *ratio > 0.0);
        let power_factor = source.number(&infeed::POWER_FACTOR).filter(|cos| *cos > 0.0 && *cos <= 1.0);
        let efficiency = source.positive::<Ratio>(&infeed::EFFICIENCY).filter(|share| share.value <= 1.0);
        // Of an apparent power the rated current follows by itself.
        let apparent = power.as_ref().is_some_and(|s| s.measure.dimension() == Dimension::ApparentPower);
        let both = power_factor.zip(efficiency);
        let (Some(rated_voltage), Some(power), Some(starting_ratio), true) =
            (voltage, power, starting_ratio, apparent || both.is_some())
        else {
            self.lacks(
                source,
                Off::Everything,
                &[&infeed::RATED_VOLTAGE, &infeed::RATED_POWER, &infeed::STARTING_CURRENT_RATIO],
            );
            if !apparent {
                self.lacks(source, Off::Everything, &[&infeed::POWER_FACTOR, &infeed::EFFICIENCY]);
            }
            return None;
        };
        if !self.stands_right(source, &infeed::RATED_VOLTAGE, at) {
            return None;
        }
        let mechanical = if apparent { both.map(|(cos, share)| power.value * cos * share) } else { Some(power.value) };
        let pairs = source.number(&infeed::POLE_PAIRS).filter(|pairs| *pairs >= 1.0);
        let (power_factor, efficiency) =
            if apparent { (1.0, Ratio::from_si(1.0)) } else { both.unwrap_or((1.0, Ratio::from_si(1.0))) };
        let r_over_x = source
            .number(&infeed::R_OVER_X)
            .or_else(|| source.number(&infeed::X_OVER_R).filter(|ratio| *ratio > 0.0).map(f64::recip));
        let motors = AsynchronousMotors {
            rated_voltage,
            rated_power: power.value,
            power_factor,
            efficiency,
            starting_ratio,
            power_a_pole_pair: mechanical.zip(pairs).map(|(power, pairs)| power / pairs),
            r_over_x: r_over_x.filter(|ratio| *ratio > 0.0),
        };
        let infeed = motors.infeed().times(number(source.facts));
        self.part(source, at, infeed.positive()?);
        Some(infeed)
    }

    pub(super) fn converter(&mut self, source: &Source<'a>, at: At) -> Option<Infeed> {
        let Some(current) = source.positive::<ElectricCurrent>(&infeed::SHORT_CIRCUIT_CURRENT) else {
            self.lacks(source, Off::Everything, &[&infeed::SHORT_CIRCUIT_CURRENT]);
            return None;
        };
        for particular in [&infeed::NOMINAL_VOLTAGE, &infeed::RATED_VOLTAGE] {
            if !self.stands_right(source, particular, at) {
                return None;
            }
        }
        let plant = ConverterPlant { current }.infeed().times(number(source.facts));
        let shown = (plant.converter_current() / at.ratio).show();
        self.part_of(source, format!("a current of {shown}"));
        Some(plant)
    }
}
