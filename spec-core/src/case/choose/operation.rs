//! Operating sequence, classes and times.

use super::{Choice, Chosen, Outcome, Value, chosen, known, measure, needs, no_value, word};
use crate::case::Case;
use crate::duty::hundreds;
use crate::particular::{breaker, circuit, system};
use crate::quantity::{Dimension, Measure, Physical, Time, significant};
use crate::rules::trv::{Network, network};
use crate::sheet::Stated;
use crate::standards::{OperatingSequence, VoltageRange, break_times, class_for_operations, operating_sequences};

pub(super) static CHOICES: &[Choice] = &[
    Choice::base(&breaker::RATED_OPERATING_SEQUENCE, sequence),
    Choice::leaf(&breaker::BREAK_TIME, break_time),
    Choice::leaf(&breaker::POLE_SIMULTANEITY_ON_OPENING, |case| simultaneity(case, OPENING_PARTS)),
    Choice::leaf(&breaker::POLE_SIMULTANEITY_ON_CLOSING, |case| simultaneity(case, CLOSING_PARTS)),
    Choice::leaf(&breaker::SPRING_CHARGING_TIME, charging),
    Choice::leaf(&breaker::POLE_OPERATION, pole_operation),
];

/// Whether the circuits reclose, and the shortest dead time that is stated; or what is missing.
struct Reclosing {
    any: bool,
    dead: Option<(Time, Measure)>,
}

fn reclosing(case: &Case<'_>) -> Result<Reclosing, super::NotChosen> {
    let mut all = Reclosing { any: false, dead: None };
    if case.circuits.is_empty() {
        return needs("a circuit, with its auto-reclosing");
    }
    for part in &case.circuits {
        let times = [&circuit::AUTO_RECLOSING_DEAD_TIME, &circuit::SINGLE_PHASE_DEAD_TIME]
            .map(|particular| part.quantity::<Time>(particular));
        match part.word(&circuit::AUTO_RECLOSING) {
            Some(("none", _)) => continue,
            None if times.iter().all(Option::is_none) => return needs("the auto-reclosing of every circuit"),
            _ => all.any = true,
        }
        for time in times.into_iter().flatten() {
            if all.dead.is_none_or(|(least, _)| time.value < least) {
                all.dead = Some((time.value, time.measure));
            }
        }
    }
    Ok(all)
}

fn pause(time: Time) -> Measure {
    measure(time.si(), Dimension::Time, if time.si() < 60.0 { "s" } else { "min" })
}

fn sequence(case: &Case<'_>) -> Outcome {
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let reclosing = reclosing(case)?;
    let later = case
        .circuits
        .iter()
        .filter_map(|part| part.quantity::<Time>(&circuit::SECOND_RECLOSING_AFTER))
        .min_by(|a, b| a.value.si().total_cmp(&b.value.si()));
    // A scheme that recloses without a stated dead time is one of the usual rapid ones.
    let rapid = operating_sequences().iter().map(OperatingSequence::first).reduce(|a, b| if b < a { b } else { a });
    let dead = if reclosing.any { reclosing.dead.map(|(time, _)| time).or(rapid) } else { None };
    let within = |pause: Time, limit: Option<Time>| limit.is_none_or(|limit| pause.si() <= limit.si() * (1.0 + 1e-4));
    let row = operating_sequences().iter().find(|row| {
        row.is_for(rated.value) && within(row.first(), dead) && within(row.second(), later.as_ref().map(|l| l.value))
    });
    let why = match (&reclosing, &later) {
        (Reclosing { any: false, .. }, _) => "no circuit recloses".to_owned(),
        (Reclosing { dead: Some((_, dead)), .. }, None) => format!("dead time {dead}"),
        (Reclosing { dead: Some((_, dead)), .. }, Some(later)) => {
            format!("dead time {dead}, second reclosing after {}", later.measure)
        }
        (Reclosing { dead: None, .. }, None) => "the circuit recloses, no dead time is stated".to_owned(),
        (Reclosing { dead: None, .. }, Some(later)) => format!("second reclosing after {}", later.measure),
    };
    let Some(row) = row else { return no_value(format!("no sequence of the standard is so fast ({why})")) };
    let (first, second) = (pause(row.first()), pause(row.second()));
    let working = format!("easiest sequence of the standard for it ({why}): O - {first} - CO - {second} - CO");
    Ok(Chosen { value: Value::Sequence(first, second), working })
}

/// Kinds of circuit whose current on switching is capacitive, besides banks.
const CHARGING: [&str; 4] = ["cable", "cable network", "overhead line", "overhead line with cable"];

/// From here on an object is switched daily, operations a day: class C2 (common practice, no source).
const DAILY: f64 = 1.0;

/// The classes of electrical endurance are for rated voltages up to here (IEC 62271-100, from memory).
const ENDURANCE_CLASSES_TO: f64 = 52e3;

pub(super) fn classes(case: &Case<'_>) -> Outcome {
    const OFTEN: &str = "the operations per day of the circuits";
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let operations = known(case.duty.switching.operations.as_ref(), OFTEN)?;
    let kinds: Option<Vec<&str>> =
        case.circuits.iter().map(|part| part.word(&circuit::KIND).map(|(kind, _)| kind)).collect();
    let kinds = known(kinds, "the kind of every circuit")?;
    let mut classes: Vec<(char, u8, String)> = Vec::new();
    let mut daily = false;
    for (part, kind) in case.circuits.iter().zip(&kinds).filter(|(_, kind)| CHARGING.contains(kind)) {
        let rate = part.quantity_reading(&circuit::OPERATIONS_PER_DAY).and_then(|(reading, _)| reading.upper().si);
        let rate = known(rate, OFTEN)? * 86_400.0;
        if rate >= DAILY * (1.0 - 1e-4) {
            daily = true;
            classes.push(('C', 2, format!("a {kind} that is switched daily")));
            break;
        }
    }
    if let Some(bank) = kinds.iter().find(|kind| matches!(**kind, "capacitor bank" | "filter bank")) {
        classes.retain(|(letter, ..)| *letter != 'C');
        classes.push(('C', 2, format!("a {bank}")));
    } else if !daily && let Some(kind) = kinds.iter().find(|kind| CHARGING.contains(*kind)) {
        classes.push(('C', 1, format!("a {kind} that is switched less than daily")));
    }
    if rated.value.si() <= ENDURANCE_CLASSES_TO * (1.0 + 1e-4) && !case.regimes().only_ieee() {
        let any = reclosing(case)?.any;
        let why = if any { "a circuit recloses" } else { "no circuit recloses" };
        classes.push(('E', if any { 2 } else { 1 }, why.to_owned()));
    }
    let Some(grade) = class_for_operations(operations.value.value) else {
        return no_value(format!("no class M covers {} operations over the life", hundreds(operations.value.value)));
    };
    classes.push(('M', grade, operations.working.to_string()));
    if VoltageRange::of(rated.value) == VoltageRange::Below100 && !case.is_generator_breaker() {
        let (network, _) = known(network(case), "the connection of the system (overhead lines or cables)")?;
        let (grade, why) = if network == Network::Lines { (2, "overhead lines") } else { (1, "cables") };
        classes.push(('S', grade, why.to_owned()));
    }
    let working =
        classes.iter().map(|(letter, grade, why)| format!("{letter}{grade}: {why}")).collect::<Vec<_>>().join("; ");
    let value = Value::Classes(classes.into_iter().map(|(letter, grade, _)| (letter, grade)).collect());
    Ok(Chosen { value, working })
}

fn break_time(case: &Case<'_>) -> Outcome {
    let frequency = known(case.frequency(), "the rated frequency")?;
    let relay = known(case.system.greatest::<Time>(&system::RELAY_TIME), "the relay time of the system")?;
    let critical = case.system.quantity::<Time>(&system::CRITICAL_CLEARING_TIME);
    let failure = case.system.quantity::<Time>(&system::BREAKER_FAILURE_TIME);
    if critical.is_none() && failure.is_none() {
        return needs("the critical clearing time of the system");
    }
    let margin = case.policy.clearing_margin;
    let left = |limit: &Stated<'_, Time>, breaks: f64| (limit.value.si() - relay.value.si() - margin) / breaks;
    let allowed = [critical.as_ref().map(|t| left(t, 1.0)), failure.as_ref().map(|t| left(t, 2.0))]
        .into_iter()
        .flatten()
        .fold(f64::INFINITY, f64::min);
    let ms = |seconds: f64| format!("{} ms", significant(seconds * 1e3, 3));
    let limits: Vec<String> = [(critical, "critical clearing time"), (failure, "breaker-failure time")]
        .into_iter()
        .filter_map(|(limit, name)| limit.map(|limit| format!("{name} {}", limit.measure)))
        .collect();
    let given = format!("{}, relay {}, margin {}", limits.join(", "), relay.measure, ms(margin));
    match break_times(frequency).rev().find(|(_, time)| time.si() <= allowed * (1.0 + 1e-4)) {
        Some((cycles, time)) => {
            let value = measure(time.si(), Dimension::Time, "ms");
            let cycles = significant(cycles, 2);
            chosen(value, format!("slowest class within {} ({given}): {cycles} cycles, {value}", ms(allowed)))
        }
        None => no_value(format!("no class is within {} ({given})", ms(allowed.max(0.0)))),
    }
}

/// Parts of a cycle on opening and closing (IEC 62271-100, from memory).
const OPENING_PARTS: f64 = 6.0;
const CLOSING_PARTS: f64 = 4.0;

fn simultaneity(case: &Case<'_>, parts: f64) -> Outcome {
    let frequency = known(case.frequency(), "the rated frequency")?;
    // Down to tenths of a millisecond, so that the limit is kept.
    let limit = (1e4 / (parts * frequency.si()) + 1e-9).floor() * 1e-4;
    let value = measure(limit, Dimension::Time, "ms");
    chosen(value, format!("1/{} of a cycle at {}: {value}", significant(parts, 1), frequency.show()))
}

fn charging(case: &Case<'_>) -> Outcome {
    let sequence = case.breaker.sequence(&breaker::RATED_OPERATING_SEQUENCE);
    let last = sequence.as_ref().and_then(|(sequence, _)| sequence.pauses().last()).and_then(|pause| pause.measure);
    let last = known(last, "the rated operating sequence")?;
    let seconds = known(last.si, "the rated frequency, for a pause in cycles")?;
    let value = measure(seconds, Dimension::Time, "s");
    chosen(value, format!("the last pause of the sequence, {last}: {value}"))
}

fn pole_operation(case: &Case<'_>) -> Outcome {
    let reclosing = reclosing(case)?;
    let single = case.circuits.iter().any(|part| {
        part.word(&circuit::AUTO_RECLOSING).is_some_and(|(word, _)| word.starts_with("single-phase"))
            || part.mentions(&circuit::SINGLE_PHASE_DEAD_TIME)
    });
    let controlled = case.breaker.word(&breaker::CONTROLLED_SWITCHING).is_some_and(|(word, _)| word != "none");
    match (single, controlled, reclosing.any) {
        (true, ..) => word("single-pole", "a single phase recloses: each pole has its drive"),
        (_, true, _) => word("single-pole", "controlled switching moves each pole at its own instant"),
        (_, _, true) => word("three-pole", "only three phases reclose: one drive does"),
        _ => word("three-pole", "no circuit recloses: one drive does"),
    }
}

#[cfg(test)]
mod tests {
    use super::super::testing::{chooses, open};
    use crate::rules::testing::Bay;

    const SEQUENCE: &str = "rated operating sequence";

    fn dead(time: &str) -> Bay {
        Bay::new().set("circuit", "auto-reclosing dead time", time)
    }

    fn no_reclosing() -> Bay {
        Bay::new().set("circuit", "auto-reclosing", "none").without("circuit", "auto-reclosing dead time")
    }

    #[test]
    fn a_sequence_by_the_dead_time() {
        chooses(dead("0.3 s"), SEQUENCE, "O - 0.3 s - CO - 3 min - CO");
        open(dead("0.29 s"), SEQUENCE, "no sequence");
        chooses(dead("179 s"), SEQUENCE, "O - 0.3 s - CO - 3 min - CO");
        chooses(dead("180 s"), SEQUENCE, "O - 3 min - CO - 3 min - CO");
        chooses(no_reclosing(), SEQUENCE, "O - 3 min - CO - 3 min - CO");
        open(no_reclosing().without("circuit", "auto-reclosing"), SEQUENCE, "auto-reclosing");
        open(Bay::new().without_sheet("circuit"), SEQUENCE, "a circuit");
    }

    #[test]
    fn the_second_pause() {
        let second = |time: &str| dead("0.3 s").set("circuit", "second reclosing after", time);
        chooses(second("180 s"), SEQUENCE, "O - 0.3 s - CO - 3 min - CO");
        chooses(second("179 s"), SEQUENCE, "O - 0.3 s - CO - 1 min - CO");
        open(second("59 s"), SEQUENCE, "no sequence");
        chooses(second("59 s").set("breaker", "rated voltage", "52 kV"), SEQUENCE, "O - 0.3 s - CO - 15 s - CO");
    }

    /// 2000 operations in 30 years are 0.18 a day, 10 000 are 0.91 (own calculation).
    #[test]
    fn classes_that_follow() {
        let often = |rate: &str| Bay::new().set("circuit", "operations per day", rate);
        chooses(often("0.18 per day"), "classes", "C1, M1");
        chooses(often("0.19 per day"), "classes", "C1, M2");
        open(often("0.92 per day"), "classes", "no class M");
        let short = |rate: &str| often(rate).set("tender", "service life", "10 years");
        chooses(short("1 per day"), "classes", "C2, M2");
        chooses(short("0.99 per day"), "classes", "C1, M2");
        open(Bay::new(), "classes", "operations per day");
        chooses(often("0.1 per day").set("circuit", "kind", "capacitor bank"), "classes", "C2, M1");
        chooses(often("0.1 per day").set("circuit", "kind", "transformer"), "classes", "M1");
    }

    #[test]
    fn classes_of_medium_voltage() {
        let bay = |kv: &str| {
            Bay::new().set("circuit", "operations per day", "0.1 per day").set("breaker", "rated voltage", kv)
        };
        chooses(bay("52 kV"), "classes", "C1, E2, M1, S2");
        chooses(bay("72.5 kV"), "classes", "C1, M1, S2");
        chooses(bay("100 kV"), "classes", "C1, M1");
        chooses(bay("24 kV").set("system", "connection", "cables"), "classes", "C1, E2, M1, S1");
        let silent = bay("24 kV").without("system", "connection").set("circuit", "kind", "transformer");
        open(silent, "classes", "connection");
    }

    /// 50 Hz: 2, 3 and 5 cycles are 40, 60 and 100 ms; the margin is 20 ms.
    #[test]
    fn break_time_by_the_critical_clearing_time() {
        let bay = |critical: &str| {
            Bay::new().set("system", "critical clearing time", critical).set("system", "relay time", "20 ms")
        };
        chooses(bay("140 ms"), "break time", "100 ms");
        chooses(bay("139 ms"), "break time", "60 ms");
        chooses(bay("99 ms"), "break time", "40 ms");
        open(bay("79 ms"), "break time", "no class");
        open(Bay::new().set("system", "relay time", "20 ms"), "break time", "critical clearing time");
        open(Bay::new().set("system", "critical clearing time", "140 ms"), "break time", "relay time");
        chooses(bay("140 ms").set("system", "breaker-failure time", "159 ms"), "break time", "40 ms");
    }

    #[test]
    fn times_that_follow_from_frequency_and_sequence() {
        chooses(Bay::new(), "pole simultaneity on opening", "3.3 ms");
        chooses(Bay::new(), "pole simultaneity on closing", "5 ms");
        chooses(Bay::new(), "spring charging time", "180 s");
        open(Bay::new().without("breaker", SEQUENCE), "spring charging time", "operating sequence");
        let no_frequency = Bay::new().without("breaker", "rated frequency").without("system", "frequency");
        open(no_frequency, "pole simultaneity on opening", "frequency");
    }

    #[test]
    fn drives() {
        chooses(Bay::new(), "pole operation", "three-pole");
        chooses(no_reclosing(), "pole operation", "three-pole");
        let single = Bay::new().set("circuit", "auto-reclosing", "single-phase");
        chooses(single, "pole operation", "single-pole");
        open(no_reclosing().without("circuit", "auto-reclosing"), "pole operation", "auto-reclosing");
    }
}
