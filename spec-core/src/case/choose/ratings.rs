//! Voltage, frequency, currents, and what follows from the short circuit.

use super::{Choice, Outcome, chosen, known, measure, no_value, printed, regimes};
use crate::case::Case;
use crate::duty::percent;
use crate::particular::{breaker, circuit, system, tender};
use crate::quantity::{Dimension, ElectricCurrent, ElectricPotential, Frequency, Physical, Ratio, Time, significant};
use crate::sheet::Stated;
use crate::standards::{self, PreferredCurrents, RatingSeries, TimeConstants};

pub(super) static CHOICES: &[Choice] = &[
    Choice::base(&breaker::RATED_FREQUENCY, frequency),
    Choice::base(&breaker::RATED_VOLTAGE, voltage),
    Choice::base(&breaker::RATED_CONTINUOUS_CURRENT, continuous),
    Choice::base(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT, breaking),
    Choice::base(&breaker::DC_TIME_CONSTANT, time_constant),
    Choice::base(&breaker::RATED_SHORT_CIRCUIT_MAKING_CURRENT, making),
    Choice::base(&breaker::RATED_SHORT_TIME_WITHSTAND_CURRENT, short_time),
    Choice::base(&breaker::RATED_DURATION_OF_SHORT_CIRCUIT, duration),
    Choice::leaf(&breaker::RATED_PEAK_WITHSTAND_CURRENT, making),
    Choice::leaf(&breaker::DC_COMPONENT_AT_CONTACT_SEPARATION, dc_component),
    Choice::leaf(&breaker::SYSTEM_SOURCE_BREAKING_CURRENT, system_source),
    Choice::leaf(&breaker::GENERATOR_SOURCE_BREAKING_CURRENT, generator_source),
    Choice::leaf(&breaker::GENERATOR_SOURCE_DC_COMPONENT, generator_source_dc),
    Choice::leaf(&breaker::DOUBLE_EARTH_FAULT_BREAKING_CURRENT, double_earth_fault),
];

const BREAKING: &str = "the rated short-circuit breaking current";

fn frequency(case: &Case<'_>) -> Outcome {
    let system = known(case.system.quantity::<Frequency>(&system::FREQUENCY), "the frequency of the system")?;
    chosen(system.measure, format!("the frequency of the system: {}", system.measure))
}

fn voltage(case: &Case<'_>) -> Outcome {
    let system = known(case.duty.system_voltage.as_ref(), "the highest voltage of the system")?;
    let Some(rated) = standards::rated_at_or_above(system.value, &regimes(case)) else {
        return no_value(format!("no rated voltage of the list reaches Um = {}", system.value.show()));
    };
    let working = format!("smallest rated voltage not below Um = {}: {}", system.value.show(), rated.show());
    chosen(measure(ElectricPotential::si(rated), Dimension::Voltage, "kV"), working)
}

fn continuous(case: &Case<'_>) -> Outcome {
    let load = known(case.duty.load_current.as_ref(), "the load current of a circuit")?;
    let series = PreferredCurrents::of(RatingSeries::Continuous, &regimes(case));
    let Some(rated) = series.at_or_above(load.value) else {
        return no_value(format!("no preferred continuous current reaches {}", load.value.show()));
    };
    let working = format!("smallest preferred value not below {}: {} A", load.working, significant(rated.si(), 4));
    chosen(measure(rated.si(), Dimension::Current, "A"), working)
}

fn breaking(case: &Case<'_>) -> Outcome {
    let duty = known(case.duty.breaking_duty.as_ref(), "the short-circuit current of the system")?;
    let (share, with_margin) = margin(case);
    let needed = ElectricCurrent::from_si(duty.value.si() / (1.0 - share));
    let Some(rated) = PreferredCurrents::of(RatingSeries::Breaking, &regimes(case)).at_or_above(needed) else {
        return no_value(format!("no preferred breaking current reaches {}{with_margin}", duty.value.show()));
    };
    let working = format!("smallest preferred value not below {}{with_margin}: {}", duty.value.show(), rated.show());
    chosen(measure(rated.si(), Dimension::Current, "kA"), working)
}

/// The reserve that the tender asks for, else the buyer's settings; and how it is called.
fn margin(case: &Case<'_>) -> (f64, String) {
    if let Some(stated) = case.tender.quantity::<Ratio>(&tender::SHORT_CIRCUIT_MARGIN) {
        return (stated.value.value.clamp(0.0, 0.9), format!(" with a margin of {}", stated.measure));
    }
    match case.policy.short_circuit_margin {
        share if share > 0.0 => (share.min(0.9), format!(" with a margin of {} by the settings", percent(share))),
        _ => (0.0, String::new()),
    }
}

fn time_constant(case: &Case<'_>) -> Outcome {
    let tau = known(case.duty.time_constant.as_ref(), "the time constant or X/R of the system")?;
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let listed = TimeConstants::of(rated.value, case.is_generator_breaker()).at_or_above(tau.value);
    let Some(listed) = listed else {
        return no_value(format!("no time constant that is listed at {} reaches {}", rated.measure, tau.value.show()));
    };
    let working = format!("least listed time constant not below {}: {}", tau.working, listed.show());
    chosen(measure(Time::si(listed), Dimension::Time, "ms"), working)
}

fn isc<'a>(case: &'a Case<'_>) -> Option<Stated<'a, ElectricCurrent>> {
    case.breaker.quantity(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT)
}

fn making(case: &Case<'_>) -> Outcome {
    let breaking = known(isc(case), BREAKING)?;
    let (factor, why) = known(
        crate::duty::making_factor_of(case, &case.duty),
        "the rated DC time constant and a frequency of 50 or 60 Hz",
    )?;
    let rated = breaking.value * factor;
    let working =
        format!("F Isc with F = {} ({why}), Isc = {}: {}", significant(factor, 3), breaking.measure, rated.show());
    chosen(measure(rated.si(), Dimension::Current, "kA"), working)
}

fn short_time(case: &Case<'_>) -> Outcome {
    let breaking = known(isc(case), BREAKING)?;
    chosen(breaking.measure, format!("equal to the breaking current: {}", breaking.measure))
}

fn duration(case: &Case<'_>) -> Outcome {
    let current = known(
        case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_SHORT_TIME_WITHSTAND_CURRENT),
        "the rated short-time withstand current",
    )?;
    if !case.system.mentions(&system::BACKUP_CLEARING_TIME) {
        return super::needs("the backup clearing time of the system");
    }
    let heat = known(
        case.duty.thermal_duty.as_ref(),
        "the short-circuit current and the time constant of the system, for the heat of the longest fault",
    )?;
    let least = Time::from_si(heat.value.si() / (current.value.si() * current.value.si()));
    let Some(rated) = standards::durations().find(|t| t.si() >= least.si() * (1.0 - SAME)) else {
        return no_value(format!(
            "no standard duration at {} covers {}: raise the current",
            current.measure,
            heat.value.show()
        ));
    };
    let working = format!(
        "least standard duration not below Ith^2 Tk/Ik^2 = {}/({})^2 = {} s: {} s",
        heat.value.show(),
        current.measure,
        significant(least.si(), 3),
        significant(rated.si(), 3)
    );
    chosen(measure(rated.si(), Dimension::Time, "s"), working)
}

/// Below this relative difference two values are one: printed digits.
const SAME: f64 = 1e-4;

fn dc_component(case: &Case<'_>) -> Outcome {
    let share = known(
        case.duty.dc_share_rated.as_ref(),
        "the minimum opening time, the frequency and the rated DC time constant",
    )?;
    chosen(printed(share.value.value, Dimension::Share, "%"), share.working.to_string())
}

fn system_source(case: &Case<'_>) -> Outcome {
    let breaking = known(isc(case), BREAKING)?;
    chosen(breaking.measure, format!("equal to the breaking current: {}", breaking.measure))
}

fn generator_source(case: &Case<'_>) -> Outcome {
    let current = case
        .circuits
        .iter()
        .filter_map(|part| part.quantity::<ElectricCurrent>(&circuit::GENERATOR_SOURCE_SHORT_CIRCUIT_CURRENT))
        .max_by(|a, b| a.value.si().total_cmp(&b.value.si()));
    let current = known(current, "the generator-source short-circuit current of a circuit")?;
    let Some(rated) = PreferredCurrents::of(RatingSeries::Breaking, &regimes(case)).at_or_above(current.value) else {
        return no_value(format!("no preferred breaking current reaches {}", current.measure));
    };
    let working = format!("smallest preferred value not below {}: {}", current.measure, rated.show());
    chosen(measure(rated.si(), Dimension::Current, "kA"), working)
}

fn generator_source_dc(case: &Case<'_>) -> Outcome {
    let share = case
        .circuits
        .iter()
        .filter_map(|part| part.quantity::<Ratio>(&circuit::GENERATOR_SOURCE_DC_COMPONENT))
        .max_by(|a, b| a.value.si().total_cmp(&b.value.si()));
    let share = known(share, "the generator-source DC component of a circuit")?;
    chosen(share.measure, format!("that of the circuit: {}", share.measure))
}

/// Two earth faults put the voltage between phases across one pole, and sqrt3/2 of the three-phase current through it.
/// IEC 62271-100:2008 6.108, from memory.
fn double_earth_fault(case: &Case<'_>) -> Outcome {
    let breaking = known(isc(case), BREAKING)?;
    match known(case.system.word(&system::NEUTRAL), "the neutral of the system")?.0 {
        "isolated" | "resonant earthed" => {}
        word => return no_value(format!("a neutral that is {word} has no such duty: leave the line out")),
    }
    let rated = breaking.value * (3f64.sqrt() / 2.0);
    let working = format!("sqrt3/2 Isc = 0.866 x {} = {}", breaking.measure, rated.show());
    chosen(printed(rated.si(), Dimension::Current, "kA"), working)
}

#[cfg(test)]
mod tests {
    use super::super::testing::{choice_with, chooses, open};
    use crate::rules::Policy;
    use crate::rules::testing::Bay;

    const ISC: &str = "rated short-circuit breaking current";
    const TK: &str = "rated duration of short-circuit";

    fn fault(current: &str) -> Bay {
        Bay::new().set("system", "short-circuit current", current)
    }

    #[test]
    fn voltage_and_frequency() {
        let um = |text: &str| Bay::new().set("system", "highest voltage", text);
        chooses(um("145 kV"), "rated voltage", "145 kV");
        chooses(um("144 kV"), "rated voltage", "145 kV");
        chooses(um("146 kV"), "rated voltage", "170 kV");
        open(um("1300 kV"), "rated voltage", "no rated voltage");
        open(Bay::new().without("system", "highest voltage"), "rated voltage", "highest voltage of the system");
        chooses(Bay::new(), "rated frequency", "50 Hz");
        open(Bay::new().without("system", "frequency"), "rated frequency", "frequency of the system");
    }

    #[test]
    fn currents_of_the_series() {
        chooses(fault("31.5 kA"), ISC, "31.5 kA");
        chooses(fault("31.6 kA"), ISC, "40 kA");
        chooses(fault("31.4 kA"), ISC, "31.5 kA");
        open(fault("300 kA"), ISC, "no preferred breaking current");
        let load = |text: &str| Bay::new().set("circuit", "load current", text);
        chooses(load("1250 A"), "rated continuous current", "1250 A");
        chooses(load("1251 A"), "rated continuous current", "1600 A");
        open(Bay::new().without("circuit", "load current"), "rated continuous current", "load current");
    }

    /// 10 % of reserve: 28.35 kA is the most that 31.5 kA covers.
    #[test]
    fn the_margin_of_the_tender_and_of_the_settings() {
        let tender = |current: &str| fault(current).set("tender", "short-circuit margin", "10 %");
        chooses(tender("28.35 kA"), ISC, "31.5 kA");
        chooses(tender("28.4 kA"), ISC, "40 kA");
        let policy = Policy { short_circuit_margin: 0.1, ..Policy::default() };
        let of = |bay: Bay| choice_with(bay, ISC, &policy).expect("a value").0;
        assert_eq!((of(fault("28.35 kA")), of(fault("28.4 kA"))), ("31.5 kA".to_owned(), "40 kA".to_owned()));
        // The tender's own line counts where there is one.
        assert_eq!(of(fault("28.4 kA").set("tender", "short-circuit margin", "0 %")), "31.5 kA");
    }

    #[test]
    fn time_constant_making_and_peak() {
        let tau = |text: &str| Bay::new().set("system", "DC time constant", text);
        chooses(tau("45 ms"), "DC time constant", "45 ms");
        chooses(tau("45.1 ms"), "DC time constant", "60 ms");
        open(tau("61 ms"), "DC time constant", "no time constant");
        open(Bay::new().without("system", "DC time constant"), "DC time constant", "X/R");
        chooses(Bay::new(), "rated short-circuit making current", "78.75 kA");
        chooses(Bay::new().set("breaker", "DC time constant", "60 ms"), "rated peak withstand current", "85.05 kA");
        open(Bay::new().without("breaker", ISC), "rated peak withstand current", "breaking current");
    }

    /// 31.5 kA for 1 s is 992 kA2s; 28.4 kA reaches that, its DC component counted, at about 1.19 s.
    #[test]
    fn duration_by_the_heat_of_the_longest_fault() {
        let bay = |backup: &str| {
            Bay::new().set("breaker", "rated short-time withstand current", "31.5 kA").set(
                "system",
                "backup clearing time",
                backup,
            )
        };
        chooses(bay("0.55 s"), TK, "0.5 s");
        chooses(bay("1.18 s"), TK, "1 s");
        chooses(bay("1.20 s"), TK, "2 s");
        open(bay("5 s"), TK, "raise the current");
        open(bay("1 s").without("system", "backup clearing time"), TK, "backup clearing time");
        open(bay("1 s").without("system", "DC time constant"), TK, "time constant");
    }

    #[test]
    fn what_hangs_on_the_breaking_current() {
        // 25 ms and half a cycle at 50 Hz with 45 ms: exp(-35/45) (own calculation).
        chooses(Bay::new(), "DC component at contact separation", "45.9 %");
        open(Bay::new().without("breaker", "opening time"), "DC component at contact separation", "opening time");
        chooses(Bay::new(), "system-source breaking current", "31.5 kA");
        let isolated = Bay::new().set("system", "neutral", "isolated");
        chooses(isolated, "double-earth-fault breaking current", "27.3 kA");
        open(Bay::new(), "double-earth-fault breaking current", "leave the line out");
    }

    #[test]
    fn generator_source() {
        let bay = |current: &str| Bay::new().set("circuit", "generator-source short-circuit current", current);
        chooses(bay("25 kA"), "generator-source breaking current", "25 kA");
        chooses(bay("25.1 kA"), "generator-source breaking current", "31.5 kA");
        open(Bay::new(), "generator-source breaking current", "generator-source short-circuit current");
        let share = Bay::new().set("circuit", "generator-source DC component", "110 %");
        chooses(share, "generator-source DC component", "110 %");
        open(Bay::new(), "generator-source DC component", "generator-source DC component of a circuit");
    }
}
