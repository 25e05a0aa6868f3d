//! What `from duty` chooses: the smallest standard value that meets the duty, with its working.

use super::Case;
use crate::particular::{Particular, breaker};
use crate::quantity::{
    Dimension, ElectricCurrent, ElectricPotential, Frequency, Measure, Physical, Ratio, Time, canonical, look_up,
    significant,
};
use crate::sheet::{QuantityReading, Reading, Statement};
use crate::standards::{self, PreferredCurrents, RatingSeries, Regime, TimeConstants};

/// A chosen value.
struct Chosen {
    measure: Measure,
    working: String,
}

type Choice = fn(&Case<'_>) -> Option<Chosen>;

/// What can be chosen, what has to be known for it, and how; in the order in which ratings hang on each other.
static CHOICES: &[(&Particular, &str, Choice)] = &[
    (&breaker::RATED_FREQUENCY, "the frequency of the system", frequency),
    (&breaker::RATED_VOLTAGE, "the highest voltage of the system", voltage),
    (&breaker::RATED_CONTINUOUS_CURRENT, "the load current of a circuit", continuous),
    (&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT, "the short-circuit current of the system", breaking),
    (
        &breaker::DC_TIME_CONSTANT,
        "the time constant or X/R of the system, and a listed value that covers it",
        time_constant,
    ),
    (&breaker::RATED_SHORT_CIRCUIT_MAKING_CURRENT, "the breaking current, the time constant and the frequency", making),
    (&breaker::RATED_SHORT_TIME_WITHSTAND_CURRENT, "the breaking current", short_time),
    (&breaker::RATED_PEAK_WITHSTAND_CURRENT, "the breaking current, the time constant and the frequency", making),
    (&breaker::FIRST_POLE_TO_CLEAR_FACTOR, "the earthing of the neutral, and the rated voltage", first_pole),
];

/// What has to be known before the checker can choose a particular; none where it cannot choose it at all.
pub(crate) fn needed_for(particular: &Particular) -> Option<&'static str> {
    CHOICES.iter().find(|(chosen, _, _)| chosen.is(particular)).map(|(_, needed, _)| *needed)
}

/// Puts a value wherever the text says `from duty` and the duty is known; tells whether any was put in.
pub(super) fn fill(case: &mut Case<'_>) -> bool {
    let mut any = false;
    for (particular, _, choose) in CHOICES {
        let asked = case.breaker.all(particular).any(|s| s.reading == Reading::FromDuty);
        let Some(chosen) = asked.then(|| choose(case)).flatten() else { continue };
        let open = |statement: &Statement| statement.states(particular) && statement.reading == Reading::FromDuty;
        for statement in case.breaker.facts.statements_mut(open) {
            statement.reading = Reading::Quantity(QuantityReading {
                measure: chosen.measure,
                second: None,
                bound: None,
                qualifiers: Vec::new(),
                at: None,
                lasting: None,
                tolerance: None,
                again: Vec::new(),
                place: statement.value,
            });
            statement.chosen = Some(chosen.working.clone());
            any = true;
        }
        case.duty = crate::duty::Duty::of(case);
    }
    any
}

fn measure(value: f64, dimension: Dimension, unit: &str) -> Measure {
    let unit = look_up(unit, &[dimension]).map_or_else(|| canonical(dimension), |spelt| spelt.unit);
    let number = unit.from_si(value).unwrap_or(value);
    // Rounded to what the tables print, so that 31.5 kA is not 31.499999 kA.
    let number = (number * 1e4).round() / 1e4;
    let text = significant(number, 6);
    let decimals = text.split_once('.').map_or(0, |(_, fraction)| fraction.len() as u8);
    Measure { number, decimals, unit, si: Some(value) }
}

fn regimes(case: &Case<'_>) -> Vec<Regime> {
    case.regimes().families()
}

fn frequency(case: &Case<'_>) -> Option<Chosen> {
    let system = case.system.quantity::<Frequency>(&crate::particular::system::FREQUENCY)?;
    Some(Chosen { measure: system.measure, working: format!("the frequency of the system: {}", system.measure) })
}

fn voltage(case: &Case<'_>) -> Option<Chosen> {
    let system = case.duty.system_voltage.as_ref()?;
    let rated = standards::rated_at_or_above(system.value, &regimes(case))?;
    let working = format!("smallest rated voltage not below Um = {}: {}", system.value.show(), rated.show());
    Some(Chosen { measure: measure(ElectricPotential::si(rated), Dimension::Voltage, "kV"), working })
}

fn continuous(case: &Case<'_>) -> Option<Chosen> {
    let load = case.duty.load_current.as_ref()?;
    let series = PreferredCurrents::of(RatingSeries::Continuous, &regimes(case));
    let rated = series.at_or_above(load.value)?;
    let working = format!("smallest preferred value not below {}: {} A", load.working, significant(rated.si(), 4));
    Some(Chosen { measure: measure(rated.si(), Dimension::Current, "A"), working })
}

fn breaking(case: &Case<'_>) -> Option<Chosen> {
    let duty = case.duty.breaking_duty.as_ref()?;
    let margin = case.tender.quantity::<Ratio>(&crate::particular::tender::SHORT_CIRCUIT_MARGIN);
    let share = margin.map_or(0.0, |m| m.value.value);
    let needed = ElectricCurrent::from_si(duty.value.si() / (1.0 - share.clamp(0.0, 0.9)));
    let rated = PreferredCurrents::of(RatingSeries::Breaking, &regimes(case)).at_or_above(needed)?;
    let with_margin = margin.map(|m| format!(" with a margin of {}", m.measure)).unwrap_or_default();
    let working = format!("smallest preferred value not below {}{with_margin}: {}", duty.value.show(), rated.show());
    Some(Chosen { measure: measure(rated.si(), Dimension::Current, "kA"), working })
}

fn time_constant(case: &Case<'_>) -> Option<Chosen> {
    let tau = case.duty.time_constant.as_ref()?;
    let listed = TimeConstants::of(case.rated_voltage()?.value, case.is_generator_breaker()).at_or_above(tau.value)?;
    let working = format!("least listed time constant not below {}: {}", tau.working, listed.show());
    Some(Chosen { measure: measure(Time::si(listed), Dimension::Time, "ms"), working })
}

fn making(case: &Case<'_>) -> Option<Chosen> {
    let breaking = case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT)?;
    let (factor, why) = crate::duty::making_factor_of(case, &case.duty)?;
    let rated = breaking.value * factor;
    let working =
        format!("F Isc with F = {} ({why}), Isc = {}: {}", significant(factor, 3), breaking.measure, rated.show());
    Some(Chosen { measure: measure(rated.si(), Dimension::Current, "kA"), working })
}

fn short_time(case: &Case<'_>) -> Option<Chosen> {
    let breaking = case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT)?;
    Some(Chosen { measure: breaking.measure, working: format!("equal to the breaking current: {}", breaking.measure) })
}

fn first_pole(case: &Case<'_>) -> Option<Chosen> {
    let needed = case.duty.first_pole_factor.as_ref()?;
    let rated = case.rated_voltage()?;
    // Below 100 kV the standard has one value, and 1.2 is for the highest voltages only.
    let least = if rated.value.si() < 100e3 {
        1.5
    } else if rated.value.si() < 1000e3 {
        1.3
    } else {
        1.2
    };
    let factor = standards::first_pole_factors().find(|f| *f >= least - 1e-9 && *f >= needed.value.value - 1e-9)?;
    let working = format!("least standard factor not below {}: {}", needed.working, significant(factor, 2));
    Some(Chosen { measure: measure(factor, Dimension::PerUnit, ""), working })
}
