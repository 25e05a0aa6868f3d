//! Switching of lines, cables, banks and shunt reactors (IEC 62271-100, IEC 62271-110, IEEE C37.012, from memory).

use std::f64::consts::{PI, SQRT_2};

use super::trv::crest;
use crate::quantity::{
    Capacitance, CapacitancePerLength, ChoppingNumber, ElectricCurrent, ElectricPotential, Frequency, Inductance,
    Length, Physical, Power,
};

fn angular(frequency: Frequency) -> f64 {
    2.0 * PI * frequency.si()
}

/// Charging current of a line or a cable without load: w C' l U / sqrt3. A, rms; U is the highest voltage of the system.
/// IEC 62271-100, guidance on capacitive currents.
pub fn charging_current(
    capacitance: CapacitancePerLength,
    length: Length,
    voltage: ElectricPotential,
    frequency: Frequency,
) -> ElectricCurrent {
    let whole: Capacitance = capacitance * length;
    ElectricCurrent::from_si(angular(frequency) * whole.si() * voltage.si() / 3f64.sqrt())
}

/// Peak of the recovery voltage after a capacitive current was broken: 2 kc E1. V. Follows from a trapped crest.
pub fn capacitive_recovery_peak(voltage: ElectricPotential, voltage_factor: f64) -> ElectricPotential {
    crest(voltage) * (2.0 * voltage_factor)
}

/// Current of a bank: Q / (sqrt3 U). A, rms; Q at voltage U.
pub fn bank_current(power: Power, voltage: ElectricPotential) -> ElectricCurrent {
    power / (voltage * 3f64.sqrt())
}

/// Continuous current that a bank asks for: its current at the highest voltage, with the allowances for harmonics and tolerance.
/// A, rms. IEC 60871-1, IEC 62271-100, from memory.
pub fn bank_continuous_current(
    current: ElectricCurrent,
    nominal: ElectricPotential,
    highest: ElectricPotential,
    harmonics: f64,
    tolerance: f64,
) -> ElectricCurrent {
    current * (highest / nominal) * harmonics * tolerance
}

/// An inrush current.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Inrush {
    /// Its first peak.
    pub peak: ElectricCurrent,
    /// Its frequency.
    pub frequency: Frequency,
}

/// Inrush of a single bank: peak sqrt2 sqrt(Isc I1), frequency f sqrt(Isc/I1). A, Hz.
/// IEC 62271-100, annex on capacitor banks, from memory; follows from one oscillating circuit.
pub fn single_bank_inrush(short_circuit: ElectricCurrent, bank: ElectricCurrent, frequency: Frequency) -> Inrush {
    let ratio = (short_circuit / bank).value.sqrt();
    Inrush { peak: bank * (SQRT_2 * ratio), frequency: frequency * ratio }
}

/// Capacitance of a bank a phase, in star: C = I / (w U / sqrt3). F.
pub fn bank_capacitance(current: ElectricCurrent, voltage: ElectricPotential, frequency: Frequency) -> Capacitance {
    Capacitance::from_si(current.si() * 3f64.sqrt() / (angular(frequency) * voltage.si()))
}

/// Two capacitances in series, as the bank that is switched on and those already on: C1 C2 / (C1 + C2). F.
pub fn in_series(switched: Capacitance, connected: Capacitance) -> Capacitance {
    Capacitance::from_si(switched.si() * connected.si() / (switched.si() + connected.si()))
}

/// Back-to-back inrush: peak E sqrt(Ceq/L), frequency 1 / (2 pi sqrt(L Ceq)), E the crest of the phase-to-earth voltage. A, Hz.
///
/// `equivalent` is Ceq of [`in_series`], `inductance` that between the banks. IEC 62271-100, annex on capacitor banks, from memory;
/// follows from one oscillating circuit.
pub fn back_to_back_inrush(voltage: ElectricPotential, equivalent: Capacitance, inductance: Inductance) -> Inrush {
    let peak = crest(voltage).si() * (equivalent.si() / inductance.si()).sqrt();
    let frequency = 1.0 / (2.0 * PI * (equivalent.si() * inductance.si()).sqrt());
    Inrush { peak: ElectricCurrent::from_si(peak), frequency: Frequency::from_si(frequency) }
}

/// The least inductance between banks that keeps the inrush within both limits: the greater of Ceq (E/i)^2 and
/// 1 / ((2 pi f)^2 Ceq). H. The equations of [`back_to_back_inrush`], solved for L.
pub fn inductance_for_inrush(voltage: ElectricPotential, equivalent: Capacitance, limit: Inrush) -> Inductance {
    let by_peak = equivalent.si() * (crest(voltage).si() / limit.peak.si()).powi(2);
    let by_frequency = 1.0 / (angular(limit.frequency).powi(2) * equivalent.si());
    Inductance::from_si(by_peak.max(by_frequency))
}

/// A shunt reactor and what breaks its current.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ReactorSwitching {
    /// Rated voltage of the reactor, phase to phase, rms.
    pub voltage: ElectricPotential,
    /// Its three-phase reactive power at that voltage.
    pub power: Power,
    /// Frequency.
    pub frequency: Frequency,
    /// Chopping number of one interrupter.
    pub chopping: ChoppingNumber,
    /// Interrupters in series a pole.
    pub interrupters: u32,
}

impl ReactorSwitching {
    /// Inductance a phase: U^2 / (w Q). H.
    pub fn inductance(&self) -> Inductance {
        Inductance::from_si(self.voltage.si().powi(2) / (angular(self.frequency) * self.power.si()))
    }

    /// Chopped current at a capacitance beside the breaker: chi sqrt(N C). A. IEC 62271-110, from memory.
    pub fn chopped_current(&self, capacitance: Capacitance) -> ElectricCurrent {
        let root = (f64::from(self.interrupters) * capacitance.si()).sqrt();
        ElectricCurrent::from_si(self.chopping.si() * root)
    }

    /// Overvoltage by chopping to earth, over the crest of the phase-to-earth voltage: ka = sqrt(1 + 3 N chi^2 / (2 w Q)).
    ///
    /// For a reactor with its neutral earthed; the capacitance drops out. IEC 62271-110 and IEC/TR 62271-306, from memory; follows
    /// from L i^2/2 + C U^2/2.
    pub fn chopping_overvoltage(&self) -> f64 {
        let chopping = f64::from(self.interrupters) * self.chopping.si().powi(2);
        (1.0 + 3.0 * chopping / (2.0 * angular(self.frequency) * self.power.si())).sqrt()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn kv(n: f64) -> ElectricPotential {
        ElectricPotential::from_si(n * 1e3)
    }

    /// Own calculation: 100 km of 9 nF/km at 145 kV and 50 Hz take 23.7 A; trapped crests give 2.4 per unit at kc 1.2.
    #[test]
    fn lines() {
        let current = charging_current(
            CapacitancePerLength::from_si(9e-12),
            Length::from_si(100e3),
            kv(145.0),
            Frequency::from_si(50.0),
        );
        assert!((current.si() - 23.67).abs() < 0.01);
        assert!((capacitive_recovery_peak(kv(145.0), 1.2).si() / crest(kv(145.0)).si() - 2.4).abs() < 1e-12);
    }

    /// Own calculation: 20 Mvar at 66 kV take 175 A, with 72.5/66 and 1.43 they ask for 275 A; at 20 kA the inrush is 2.6 kA and 535 Hz.
    #[test]
    fn a_single_bank() {
        let current = bank_current(Power::from_si(20e6), kv(66.0));
        assert!((current.si() - 174.95).abs() < 0.01);
        let continuous = bank_continuous_current(current, kv(66.0), kv(72.5), 1.3, 1.1);
        assert!((continuous.si() - 274.8).abs() < 0.1);
        let inrush = single_bank_inrush(ElectricCurrent::from_si(20e3), current, Frequency::from_si(50.0));
        assert!((inrush.peak.si() - 2645.4).abs() < 0.5);
        assert!((inrush.frequency.si() - 534.6).abs() < 0.1);
    }

    /// The inductance that cures an inrush gives one within both limits, and at one of them.
    #[test]
    fn the_cure_of_an_inrush() {
        let f = Frequency::from_si(60.0);
        let bank = bank_capacitance(ElectricCurrent::from_si(400.0), kv(145.0), f);
        let equivalent = in_series(bank, bank);
        for (ka, hz) in [(20.0, 4250.0), (20.0, 500.0)] {
            let limit = Inrush { peak: ElectricCurrent::from_si(ka * 1e3), frequency: Frequency::from_si(hz) };
            let cured = back_to_back_inrush(kv(145.0), equivalent, inductance_for_inrush(kv(145.0), equivalent, limit));
            let shares = [(cured.peak / limit.peak).value, (cured.frequency / limit.frequency).value];
            assert!(shares.iter().all(|share| *share < 1.0 + 1e-12));
            assert!(shares.iter().any(|share| (share - 1.0).abs() < 1e-12));
        }
    }

    /// The overvoltage follows from the energy of the chopped current, whatever the capacitance. Own calculation.
    #[test]
    fn chopping_by_energy() {
        let reactor = ReactorSwitching {
            voltage: kv(420.0),
            power: Power::from_si(100e6),
            frequency: Frequency::from_si(50.0),
            chopping: ChoppingNumber::from_si(9e4),
            interrupters: 2,
        };
        for nano in [1.0, 3.0] {
            let c = Capacitance::from_si(nano * 1e-9);
            let chopped = reactor.chopped_current(c).si();
            let rise = reactor.inductance().si() * chopped * chopped / (c.si() * crest(kv(420.0)).si().powi(2));
            assert!((reactor.chopping_overvoltage() - (1.0 + rise).sqrt()).abs() < 1e-12);
        }
    }
}
