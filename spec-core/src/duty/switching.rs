//! What is switched beside faults: lines, cables, banks, reactors, and how often.

use super::{Duty, Figure, NamedFigure, named};
use crate::case::{Case, Part};
use crate::particular::{breaker, circuit, system, tender};
use crate::physics::switching::{
    Inrush, ReactorSwitching, back_to_back_inrush, bank_capacitance, bank_continuous_current, bank_current,
    charging_current, in_series, inductance_for_inrush, single_bank_inrush,
};
use crate::quantity::{
    Capacitance, CapacitancePerLength, ChoppingNumber, ElectricCurrent, ElectricPotential, Frequency, Inductance,
    Length, Physical, Power, Ratio, Time, significant,
};
use crate::sheet::Stated;
use crate::standards::{
    BankAllowance, CapacitiveCircuit, CapacitiveRating, bank_allowance, capacitive_rating, capacitive_voltage_factor,
};

/// The switching duties.
#[derive(Clone, Debug, Default)]
pub struct SwitchingDuty {
    /// The largest charging current of an overhead line, rms.
    pub line_charging_current: Option<Figure<ElectricCurrent>>,
    /// The largest charging current of a cable, or of a mixed circuit where the breaker has a rating for cables, rms.
    pub cable_charging_current: Option<Figure<ElectricCurrent>>,
    /// The capacitive voltage factor kc, in normal service.
    pub voltage_factor: Option<Figure<Ratio>>,
    /// The current of the largest bank at its voltage, rms.
    pub bank_current: Option<Figure<ElectricCurrent>>,
    /// The continuous current that the bank asks for, rms.
    pub bank_continuous_current: Option<Figure<ElectricCurrent>>,
    /// The inrush of the worst bank.
    pub inrush: Option<InrushDuty>,
    /// The current of the largest shunt reactor, rms.
    pub reactor_current: Option<Figure<ElectricCurrent>>,
    /// The overvoltage by chopping, over the crest of the phase-to-earth voltage.
    pub chopping_overvoltage: Option<Figure<Ratio>>,
    /// The operations of the circuit that is switched most often, over the service life.
    pub operations: Option<Figure<Ratio>>,
}

/// An inrush.
#[derive(Clone, Debug)]
pub struct InrushDuty {
    /// Its first peak.
    pub peak: Figure<ElectricCurrent>,
    /// Its frequency.
    pub frequency: Figure<Frequency>,
    /// Between banks that are on and this one: their capacitance in series. None for a bank alone.
    pub equivalent: Option<Figure<Capacitance>>,
    /// The voltage of its crest.
    pub voltage: ElectricPotential,
}

impl InrushDuty {
    /// The least inductance between the banks that keeps the inrush within `limit`; none for a bank alone.
    pub fn inductance_within(&self, limit: Inrush) -> Option<Figure<Inductance>> {
        least_inductance(self.voltage, self.equivalent.as_ref()?, limit)
    }
}

impl SwitchingDuty {
    pub(super) fn figures(&self) -> Vec<NamedFigure> {
        let inrush = self.inrush.as_ref();
        vec![
            named("line_charging_current", "A", self.line_charging_current.as_ref()),
            named("cable_charging_current", "A", self.cable_charging_current.as_ref()),
            named("capacitive_voltage_factor", "1", self.voltage_factor.as_ref()),
            named("bank_current", "A", self.bank_current.as_ref()),
            named("bank_continuous_current", "A", self.bank_continuous_current.as_ref()),
            named("inrush_peak", "A", inrush.map(|inrush| &inrush.peak)),
            named("inrush_frequency", "Hz", inrush.map(|inrush| &inrush.frequency)),
            named("reactor_current", "A", self.reactor_current.as_ref()),
            named("chopping_overvoltage", "1", self.chopping_overvoltage.as_ref()),
            named("operations", "1", self.operations.as_ref()),
        ]
    }
}

pub(super) fn fill(case: &Case<'_>, duty: &mut Duty) {
    let on_cable = case.breaker.mentions(&breaker::RATED_CABLE_CHARGING_BREAKING_CURRENT)
        || !case.breaker.mentions(&breaker::RATED_LINE_CHARGING_BREAKING_CURRENT);
    let mut found = SwitchingDuty::default();
    for part in &case.circuits {
        let Some((kind, _)) = part.word(&circuit::KIND) else { continue };
        keep(&mut found.voltage_factor, voltage_factor(duty, part, kind));
        match kind {
            "overhead line" => keep(&mut found.line_charging_current, charging(case, duty, part)),
            "cable" | "cable network" => keep(&mut found.cable_charging_current, charging(case, duty, part)),
            "overhead line with cable" => {
                let figure =
                    if on_cable { &mut found.cable_charging_current } else { &mut found.line_charging_current };
                keep(figure, charging_of_both(case, duty, part));
            }
            "capacitor bank" | "filter bank" => {
                let Some(current) = phase_current(case, duty, part) else { continue };
                keep(&mut found.bank_continuous_current, continuous(&current));
                let inrush = inrush(case, duty, part, &current);
                if inrush.as_ref().map(|i| i.peak.value) > found.inrush.as_ref().map(|i| i.peak.value) {
                    found.inrush = inrush;
                }
                keep(&mut found.bank_current, Some(current));
            }
            "shunt reactor" => {
                keep(&mut found.reactor_current, phase_current(case, duty, part));
                keep(&mut found.chopping_overvoltage, chopping(case, duty, part));
            }
            _ => {}
        }
    }
    found.operations = operations(case);
    duty.switching = found;
}

/// Keeps the larger of two figures.
fn keep<Q: Physical>(old: &mut Option<Figure<Q>>, new: Option<Figure<Q>>) {
    let Some(new) = new else { return };
    if old.as_ref().is_none_or(|old| new.value.si() > old.value.si()) {
        *old = Some(new);
    }
}

/// A current in the unit in which capacitive ratings are stated.
fn amperes(current: ElectricCurrent) -> String {
    format!("{} A", significant(current.si(), 3))
}

/// The highest voltage at which a circuit is switched: of the system, else the rated one.
fn highest(case: &Case<'_>, duty: &Duty) -> Option<Figure<ElectricPotential>> {
    duty.system_voltage.clone().or_else(|| case.rated_voltage().map(|rated| Figure::stated("Ur", &rated)))
}

/// The charging current of a line or a cable: as stated, else by its capacitance. Reactors that are switched with it take their
/// share of it away.
fn charging(case: &Case<'_>, duty: &Duty, part: &Part<'_>) -> Option<Figure<ElectricCurrent>> {
    let gross = uncompensated(case, duty, part)?;
    let together = part.yes_no(&circuit::COMPENSATION_SWITCHED_WITH_THE_CIRCUIT).is_some_and(|(yes, _)| yes);
    let reactors = part.quantity::<Power>(&circuit::SHUNT_COMPENSATION).filter(|_| together);
    let (Some(reactors), Some(voltage)) = (reactors, bank_voltage(case, duty, part)) else { return Some(gross) };
    let taken = bank_current(reactors.value, voltage.value);
    let left = ElectricCurrent::from_si((gross.value.si() - taken.si()).abs());
    Some(
        Figure::new(left, "|Ic - Q/(sqrt3 U)|, reactors switched with the circuit", "IEC/TR 62271-306, from memory")
            .from("Ic", &gross)
            .with("Q", &reactors)
            .from("U", &voltage)
            .shown(amperes(left)),
    )
}

fn uncompensated(case: &Case<'_>, duty: &Duty, part: &Part<'_>) -> Option<Figure<ElectricCurrent>> {
    if let Some(stated) = part.quantity::<ElectricCurrent>(&circuit::CHARGING_CURRENT) {
        return Some(Figure::stated("Ic", &stated).shown(amperes(stated.value)));
    }
    let capacitance = part.quantity::<CapacitancePerLength>(&circuit::CAPACITANCE_PER_LENGTH)?;
    let length = part.quantity::<Length>(&circuit::LENGTH)?;
    let (voltage, frequency) = (highest(case, duty)?, case.frequency()?);
    let current = charging_current(capacitance.value, length.value, voltage.value, frequency);
    Some(
        Figure::new(current, "w C' l Um/sqrt3", "IEC 62271-100, guidance on capacitive currents, from memory")
            .given("f", frequency.show())
            .with("C'", &capacitance)
            .with("l", &length)
            .from("Um", &voltage)
            .shown(amperes(current)),
    )
}

/// The charging current of an overhead line with a cable: of both parts, as far as they are known.
fn charging_of_both(case: &Case<'_>, duty: &Duty, part: &Part<'_>) -> Option<Figure<ElectricCurrent>> {
    let line = charging(case, duty, part);
    let cable = part.quantity::<ElectricCurrent>(&circuit::CABLE_SECTION_CHARGING_CURRENT);
    match (line, cable) {
        (Some(line), Some(cable)) => Some(
            Figure::new(line.value + cable.value, "line + cable section", "the two are in phase")
                .from("line", &line)
                .with("cable section", &cable)
                .shown(amperes(line.value + cable.value)),
        ),
        (line, None) => line,
        (None, Some(cable)) => Some(
            Figure::new(cable.value, "cable section alone, the line not known", "the text")
                .with("cable section", &cable)
                .shown(amperes(cable.value)),
        ),
    }
}

/// The voltage at which the power of a bank, or of reactors, is stated: its own, else the nominal voltage of the system, else its
/// highest.
fn bank_voltage(case: &Case<'_>, duty: &Duty, part: &Part<'_>) -> Option<Figure<ElectricPotential>> {
    let own = part.quantity::<ElectricPotential>(&circuit::BANK_VOLTAGE);
    let stated = own.or_else(|| case.system.quantity(&system::NOMINAL_VOLTAGE)).filter(|u| u.value.si() > 0.0);
    stated.map(|stated| Figure::stated("U", &stated)).or_else(|| highest(case, duty))
}

/// The current of a bank or a reactor: Q/(sqrt3 U).
fn phase_current(case: &Case<'_>, duty: &Duty, part: &Part<'_>) -> Option<Figure<ElectricCurrent>> {
    let power = part.quantity::<Power>(&circuit::BANK_POWER)?;
    let voltage = bank_voltage(case, duty, part)?;
    let current = bank_current(power.value, voltage.value);
    Some(
        Figure::new(current, "Q/(sqrt3 U)", "definition of reactive power")
            .with("Q", &power)
            .from("U", &voltage)
            .shown(amperes(current)),
    )
}

/// The continuous current of a bank. The allowances of IEC 60871-1 hold the overvoltage that a bank bears, so that the voltage does
/// not count twice.
fn continuous(current: &Figure<ElectricCurrent>) -> Option<Figure<ElectricCurrent>> {
    let (harmonics, tolerance) = (bank_allowance(BankAllowance::Harmonics)?, bank_allowance(BankAllowance::Tolerance)?);
    let same = ElectricPotential::from_si(1.0);
    let value = bank_continuous_current(current.value, same, same, harmonics, tolerance);
    Some(
        Figure::new(value, "I x harmonics x tolerance", "IEC 60871-1, from memory")
            .from("I", current)
            .given("harmonics", significant(harmonics, 3))
            .given("tolerance", significant(tolerance, 3))
            .shown(amperes(value)),
    )
}

/// Capacitances of this bank and of those already on, in series.
fn equivalent_capacitance(case: &Case<'_>, duty: &Duty, part: &Part<'_>) -> Option<Figure<Capacitance>> {
    let switched = part.quantity::<Power>(&circuit::BANK_POWER)?;
    let on = part.quantity::<Power>(&circuit::PARALLEL_BANK_POWER)?;
    let voltage = bank_voltage(case, duty, part)?;
    let frequency = case.frequency()?;
    let capacitance = |power| bank_capacitance(bank_current(power, voltage.value), voltage.value, frequency);
    let value = in_series(capacitance(switched.value), capacitance(on.value));
    Some(
        Figure::new(value, "C1 C2/(C1 + C2), C = Q/(w U2)", "definition of reactive power")
            .with("Q1", &switched)
            .with("Q2", &on)
            .from("U", &voltage)
            .given("f", frequency.show())
            .shown(format!("{} uF", significant(value.si() * 1e6, 3))),
    )
}

/// The least inductance between this bank and those already on that keeps the inrush within `limit`, whatever is stated of it.
pub(crate) fn inductance_between_banks(case: &Case<'_>, part: &Part<'_>, limit: Inrush) -> Option<Figure<Inductance>> {
    let equivalent = equivalent_capacitance(case, &case.duty, part)?;
    least_inductance(highest(case, &case.duty)?.value, &equivalent, limit)
}

/// The least inductance between banks for a limit of the inrush.
fn least_inductance(
    voltage: ElectricPotential,
    equivalent: &Figure<Capacitance>,
    limit: Inrush,
) -> Option<Figure<Inductance>> {
    let value = inductance_for_inrush(voltage, equivalent.value, limit);
    (value.si().is_finite() && value.si() > 0.0).then(|| {
        let formula = "greater of Ceq (E/i)2 and 1/((2 pi f)2 Ceq), E = Um sqrt(2/3)";
        Figure::new(value, formula, BACK_TO_BACK)
            .given("Um", voltage.show())
            .given("i", limit.peak.show())
            .given("f", limit.frequency.show())
            .given("Ceq", equivalent.working.result.clone())
            .shown(microhenry(value))
    })
}

/// The limits of an inrush: as rated, and where only one of peak and frequency is stated, the other of the standard.
pub(crate) fn inrush_limit(case: &Case<'_>) -> Option<Inrush> {
    let rated = case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CAPACITOR_BANK_INRUSH_MAKING_CURRENT);
    let frequency = case.breaker.quantity::<Frequency>(&breaker::RATED_INRUSH_FREQUENCY);
    let standard = case.rated_voltage().and_then(|rated| capacitive_rating(rated.value));
    Some(Inrush {
        peak: rated.map(|stated| stated.value).or_else(|| standard.map(CapacitiveRating::inrush_peak))?,
        frequency: frequency.map(|stated| stated.value).or_else(|| standard.map(CapacitiveRating::inrush_frequency))?,
    })
}

/// An inductance between banks, in the unit of its size.
fn microhenry(inductance: Inductance) -> String {
    format!("{} uH", significant(inductance.si() * 1e6, 3))
}

const BACK_TO_BACK: &str = "IEC 62271-100, annex on capacitor banks, IEEE C37.012, from memory";

fn inrush(case: &Case<'_>, duty: &Duty, part: &Part<'_>, current: &Figure<ElectricCurrent>) -> Option<InrushDuty> {
    let voltage = highest(case, duty)?;
    if part.mentions(&circuit::PARALLEL_BANK_POWER) {
        let equivalent = equivalent_capacitance(case, duty, part)?;
        let inductance = part.quantity::<Inductance>(&circuit::INDUCTANCE_BETWEEN_BANKS)?;
        if inductance.value.si() <= 0.0 {
            return None;
        }
        let inrush = back_to_back_inrush(voltage.value, equivalent.value, inductance.value);
        if !(inrush.peak.si().is_finite() && inrush.frequency.si().is_finite()) {
            return None;
        }
        let with = |figure: Figure<ElectricCurrent>| {
            figure.from("Um", &voltage).given("Ceq", equivalent.working.result.clone()).with("L", &inductance)
        };
        let frequency = Figure::new(inrush.frequency, "1/(2 pi sqrt(L Ceq))", BACK_TO_BACK)
            .given("Ceq", equivalent.working.result.clone())
            .with("L", &inductance);
        return Some(InrushDuty {
            peak: with(Figure::new(inrush.peak, "Um sqrt(2/3) sqrt(Ceq/L)", BACK_TO_BACK)),
            frequency,
            equivalent: Some(equivalent),
            voltage: voltage.value,
        });
    }
    let network = duty.short_circuit_current.as_ref()?;
    let own = part.quantity::<Inductance>(&circuit::CURRENT_LIMITING_INDUCTANCE);
    let frequency = case.frequency()?;
    let inrush = single_bank_inrush(network.value, current.value, frequency);
    if own.is_some() || !(inrush.peak.si().is_finite() && inrush.peak.si() > 0.0) {
        // A reactor of its own lowers it further; alone it is small as it is.
        return None;
    }
    Some(InrushDuty {
        peak: Figure::new(inrush.peak, "sqrt2 sqrt(Isc I)", BACK_TO_BACK).from("Isc", network).from("I", current),
        frequency: Figure::new(inrush.frequency, "f sqrt(Isc/I)", BACK_TO_BACK)
            .given("f", frequency.show())
            .from("Isc", network)
            .from("I", current),
        equivalent: None,
        voltage: voltage.value,
    })
}

/// The capacitive voltage factor of a circuit in normal service. None where the construction of the cable or the neutral of the
/// bank decides and is not stated.
fn voltage_factor(duty: &Duty, part: &Part<'_>, kind: &str) -> Option<Figure<Ratio>> {
    let (earthed, place) = duty.effectively_earthed?;
    let construction = part.word(&circuit::CABLE_CONSTRUCTION).map(|(word, _)| word);
    let neutral = part.word(&circuit::BANK_NEUTRAL).map(|(word, _)| word);
    let switched = match kind {
        "overhead line" | "overhead line with cable" => CapacitiveCircuit::OverheadLine,
        "cable" | "cable network" => match construction {
            Some("screened") => CapacitiveCircuit::ScreenedCable,
            Some("belted") => CapacitiveCircuit::BeltedCable,
            _ if earthed => return None,
            _ => CapacitiveCircuit::Any,
        },
        "capacitor bank" | "filter bank" => match neutral {
            Some("earthed") => CapacitiveCircuit::EarthedBank,
            Some("isolated") => CapacitiveCircuit::IsolatedBank,
            _ if earthed => return None,
            _ => CapacitiveCircuit::Any,
        },
        _ => return None,
    };
    let factor = capacitive_voltage_factor(switched, earthed, false)?;
    let what = match switched {
        CapacitiveCircuit::OverheadLine => "overhead line",
        CapacitiveCircuit::ScreenedCable => "screened cable",
        CapacitiveCircuit::BeltedCable => "belted cable",
        CapacitiveCircuit::EarthedBank => "bank with an earthed neutral",
        CapacitiveCircuit::IsolatedBank => "bank with an isolated neutral",
        CapacitiveCircuit::Any => kind,
    };
    let system = if earthed { "effectively earthed" } else { "not effectively earthed" };
    let mut figure = Figure::new(Ratio::from_si(factor), "kc by circuit and earthing", "IEC 62271-100, from memory")
        .given("circuit", what)
        .given("system", system);
    if let Some(input) = figure.working.inputs.last_mut() {
        input.place = Some(place);
    }
    Some(figure)
}

/// The overvoltage by chopping of a reactor, where the chopping number is stated.
fn chopping(case: &Case<'_>, duty: &Duty, part: &Part<'_>) -> Option<Figure<Ratio>> {
    let number = case.breaker.quantity::<ChoppingNumber>(&breaker::CHOPPING_NUMBER)?;
    let power = part.quantity::<Power>(&circuit::BANK_POWER).filter(|power| power.value.si() > 0.0)?;
    let voltage = bank_voltage(case, duty, part)?;
    let frequency = case.frequency()?;
    let reactor = ReactorSwitching {
        voltage: voltage.value,
        power: power.value,
        frequency,
        chopping: number.value,
        // The chopping number that a specification asks for is that of the whole pole.
        interrupters: 1,
    };
    let value = reactor.chopping_overvoltage();
    Some(
        Figure::new(Ratio::from_si(value), "ka = sqrt(1 + 3 chi2/(2 w Q))", "IEC 62271-110, from memory")
            .with("chi", &number)
            .with("Q", &power)
            .given("f", frequency.show())
            .shown(format!("{} per unit", significant(value, 3))),
    )
}

const DAY: f64 = 86_400.0;
const DAYS: f64 = 365.0;
/// A year in seconds, as the unit of the text has it.
const YEAR: f64 = 365.25 * DAY;

/// The operations of the circuit that is switched most often, over the service life. Its first input is how often.
fn operations(case: &Case<'_>) -> Option<Figure<Ratio>> {
    let (measure, statement) = case
        .circuits
        .iter()
        .filter_map(|part| part.quantity_reading(&circuit::OPERATIONS_PER_DAY))
        .map(|(reading, statement)| (*reading.upper(), statement))
        .max_by(|a, b| a.0.si.unwrap_or(0.0).total_cmp(&b.0.si.unwrap_or(0.0)))?;
    let rate = Stated { value: Frequency::from_si(measure.si?), measure, statement };
    let life = case.tender.quantity::<Time>(&tender::SERVICE_LIFE);
    let years = life.as_ref().map_or(case.policy.service_life, |life| (life.value.si() / YEAR).round());
    let count = rate.value.si() * DAY * DAYS * years;
    let figure = Figure::new(Ratio::from_si(count), "n x 365 x years", "arithmetic").with("n", &rate);
    let figure = match life {
        Some(life) => figure.with("service life", &life),
        None => figure.given("years", format!("{} (not stated)", significant(years, 3))),
    };
    Some(figure.shown(hundreds(count)))
}

/// To hundreds: the count is no better known.
pub(crate) fn hundreds(count: f64) -> String {
    significant((count / 100.0).round() * 100.0, 3)
}
