//! Rules on the operating sequence and reclosing.

use super::{Check, EQUAL, Rule};
use crate::case::Case;
use crate::finding::{FindingKind, Findings};
use crate::particular::{breaker, circuit};
use crate::quantity::{Physical, Time, look_up, significant};
use crate::sheet::{Sequence, SequenceStep, Stated, Statement};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&SEQUENCE_MALFORMED, &SEQUENCE_WITHOUT_RAPID_RECLOSING, &SEQUENCE_INTERVAL, &DEAD_TIME];

/// An operating sequence is well formed.
pub static SEQUENCE_MALFORMED: Rule = Rule {
    name: "sequence-malformed",
    title: "An operating sequence is well formed, with a time and its unit at every pause.",
    kind: FindingKind::Contradiction,
    basis: "IEC 62271-100:2021 5.104 (from memory)",
    formula: "operation, pause, operation ...; a time with its unit at each pause",
    explanation: "O - 0.3 s - CO - 3 min - CO: operations O, C, CO with pauses between. A pause without a unit may be seconds or \
                  minutes, and one left as a letter is no demand that a test can meet. A text that is no sequence at all is told \
                  under this name while it is read.",
    check: Check::Case(form),
};

fn rated<'a>(case: &'a Case<'_>) -> Option<(&'a Sequence, &'a Statement)> {
    case.breaker.sequence(&breaker::RATED_OPERATING_SEQUENCE)
}

fn form(case: &Case<'_>, findings: &mut Findings) {
    let Some((sequence, statement)) = rated(case) else { return };
    for pause in sequence.pauses() {
        let message = match (pause.measure, pause.bare) {
            (Some(_), _) => continue,
            (None, Some(number)) => format!("the pause {} has no unit", significant(number, 4)),
            (None, None) => "this pause is a letter: a test needs a time".to_owned(),
        };
        let finding = findings.add(&SEQUENCE_MALFORMED, pause.place, message);
        finding.label("no time").advice("write it as O - 0.3 s - CO - 3 min - CO");
        if let Some(number) = pause.bare {
            let unit = if number < 1.0 { "s" } else { "min" };
            let text = format!("{} {unit}", significant(number, 4));
            finding.edit(format!("write {text}"), pause.place, text);
        }
    }
    let alternates =
        sequence.steps.iter().enumerate().all(|(at, step)| matches!(step, SequenceStep::Pause(_)) == (at % 2 == 1));
    if !alternates || sequence.steps.len() % 2 == 0 {
        findings
            .add(&SEQUENCE_MALFORMED, statement.value, "operations and pauses have to follow each other in turn")
            .label("not an operation, a pause, an operation ...")
            .stated(sequence.to_string())
            .advice("write it as O - 0.3 s - CO - 3 min - CO");
    }
}

/// The circuits that reclose, with what says so.
fn reclosing<'a>(case: &'a Case<'_>) -> Vec<(&'a Statement, Option<Stated<'a, Time>>)> {
    case.circuits
        .iter()
        .filter_map(|part| {
            let single = || part.quantity::<Time>(&circuit::SINGLE_PHASE_DEAD_TIME);
            let dead = part.quantity::<Time>(&circuit::AUTO_RECLOSING_DEAD_TIME).or_else(single);
            let scheme = part.word(&circuit::AUTO_RECLOSING);
            match (scheme, dead) {
                (Some(("none", _)), _) | (None, None) => None,
                (Some((_, statement)), dead) => Some((statement, dead)),
                (None, Some(dead)) => Some((dead.statement, Some(dead))),
            }
        })
        .collect()
}

/// The first pause, where the sequence opens, recloses and opens again.
fn first_pause(sequence: &Sequence) -> Option<Time> {
    if !sequence.recloses() {
        return None;
    }
    sequence.pauses().next().and_then(|pause| pause.measure).and_then(|measure| measure.to())
}

/// Up to this pause a sequence recloses rapidly; the standard's value is 0.3 s, and slower schemes go up to a few seconds.
const RAPID: f64 = 10.0;

/// A scheme that recloses has a sequence that can.
pub static SEQUENCE_WITHOUT_RAPID_RECLOSING: Rule = Rule {
    name: "sequence-without-rapid-reclosing",
    title: "A circuit that recloses has a breaker whose sequence begins with a short pause.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-100:2021 5.104, IEC 56:1987 4.104 (public digest)",
    formula: "O - t - CO - t' - CO with t <= dead time (0.3 s by the standard)",
    explanation: "O - 3 min - CO - 3 min - CO cannot reclose in fractions of a second, and CO - 15 s - CO not at all. Silent where no \
                  circuit recloses, or where the dead time is as long as the sequence's own pause.",
    check: Check::Case(rapid),
};

fn rapid(case: &Case<'_>, findings: &mut Findings) {
    let Some((sequence, statement)) = rated(case) else { return };
    // A sequence whose pauses are not times is malformed, of which another finding tells.
    if sequence.times().is_none() {
        return;
    }
    for (scheme, dead) in reclosing(case) {
        let wanted = dead.as_ref().map_or(RAPID, |dead| dead.value.si());
        let able = first_pause(sequence).is_some_and(|first| first.si() <= RAPID.max(wanted) * (1.0 + EQUAL));
        if able {
            continue;
        }
        let within = dead.as_ref().map_or_else(String::new, |dead| format!(" in {}", dead.measure));
        let message = format!("the circuit recloses{within}, and {sequence} cannot");
        let rest =
            sequence.pauses().last().and_then(|p| p.measure).map_or_else(|| "3 min".to_owned(), |m| m.to_string());
        let text = format!("O - 0.3 s - CO - {rest} - CO");
        findings
            .add(&SEQUENCE_WITHOUT_RAPID_RECLOSING, statement.value, message)
            .label("cannot reclose rapidly")
            .stated(sequence.to_string())
            .needed(text.as_str())
            .beside(scheme, "the scheme that recloses")
            .replace_by(text);
        return;
    }
}

/// The second pause is a usual one.
pub static SEQUENCE_INTERVAL: Rule = Rule {
    name: "sequence-interval",
    title: "The pause before the second closing is 3 min, or one of the alternatives.",
    kind: FindingKind::Caution,
    basis: "IEC 56:1987 4.104 (public digest); IEC 62271-100:2021 5.104 (from memory)",
    formula: "t' = 3 min; also 1 min, and 15 s up to 52 kV",
    explanation: "Bidders have tests for these pauses. Above 52 kV a pause of 15 s is by agreement. Only O - t - CO - t' - CO is \
                  looked at.",
    check: Check::Case(interval),
};

/// 15 s is a pause of the standard up to here (IEC 62271-100, from memory).
const SHORT_PAUSE_TO: f64 = 52e3;

fn interval(case: &Case<'_>, findings: &mut Findings) {
    let (Some((sequence, _)), Some(rated_voltage)) = (rated(case), case.rated_voltage()) else { return };
    let Some(times) = sequence.times().filter(|times| times.len() == 2 && sequence.recloses()) else { return };
    let (Some(second), Some(pause)) = (times.get(1), sequence.pauses().nth(1)) else { return };
    let is = |seconds: f64| (second.si() - seconds).abs() <= EQUAL * seconds;
    let low_voltage = rated_voltage.value.si() <= SHORT_PAUSE_TO * (1.0 + EQUAL);
    if is(180.0) || is(60.0) || (is(15.0) && low_voltage) {
        return;
    }
    let shown = pause.measure.map_or_else(|| second.show(), |m| m.to_string());
    let message = if is(15.0) {
        format!(
            "a pause of {shown} is a value of the standard up to 52 kV; at {} it is by agreement",
            rated_voltage.measure
        )
    } else {
        format!("a pause of {shown} before the second closing is no value of the standard")
    };
    findings
        .add(&SEQUENCE_INTERVAL, pause.place, message)
        .label("not a usual pause")
        .stated(shown.as_str())
        .needed("3 min")
        .replace_by("3 min");
}

/// The scheme's dead time is not shorter than the sequence's first pause.
pub static DEAD_TIME: Rule = Rule {
    name: "dead-time",
    title: "The dead times of the scheme are not shorter than the pauses of the sequence.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-100:2021 5.104; IEEE C37.04: 0.3 s with 18 to 22 cycles (from memory)",
    formula: "dead time >= t, second reclosing after >= t' of O - t - CO - t' - CO",
    explanation: "The breaker is tested to reclose after the pauses of its sequence, not before; the second shot as well as the first, \
                  three-pole or single-pole. Around 0.3 s the trade's 18 to 22 cycles at 60 Hz fit. Where the sequence cannot reclose \
                  at all, sequence-without-rapid-reclosing speaks alone; silent where the scheme is none.",
    check: Check::Case(dead_time),
};

fn dead_time(case: &Case<'_>, findings: &mut Findings) {
    let Some((sequence, statement)) = rated(case) else { return };
    let Some(first) = first_pause(sequence).filter(|first| first.si() <= RAPID) else { return };
    let second = sequence.times().and_then(|times| times.get(1).copied());
    let reclosed =
        case.circuits.iter().filter(|part| !matches!(part.word(&circuit::AUTO_RECLOSING), Some(("none", _))));
    for part in reclosed {
        for (particular, pause, which) in [
            (&circuit::AUTO_RECLOSING_DEAD_TIME, Some(first), "first"),
            (&circuit::SINGLE_PHASE_DEAD_TIME, Some(first), "first"),
            (&circuit::SECOND_RECLOSING_AFTER, second, "second"),
        ] {
            let (Some(dead), Some(pause)) = (part.quantity::<Time>(particular), pause) else { continue };
            if dead.value.si() >= pause.si() * (1.0 - EQUAL) {
                continue;
            }
            let unit = look_up("s", &[])
                .map_or_else(|| pause.show(), |s| format!("{} {}", significant(pause.si(), 3), s.unit.name));
            let label = if which == "first" { "a dead time" } else { "a second reclosing after a pause" };
            let message =
                format!("{label} of {} is shorter than the {which} pause of the sequence, {unit}", dead.measure);
            findings
                .add(&DEAD_TIME, dead.place(), message)
                .label("shorter than the sequence's pause")
                .stated(&dead.measure)
                .needed(unit.as_str())
                .beside(statement, "the operating sequence")
                .advice("lengthen the dead time, or ask for a sequence with the shorter pause");
        }
    }
}

#[cfg(test)]
mod tests {
    use crate::rules::testing::Bay;

    fn sequence(text: &str) -> Bay {
        Bay::new().set("breaker", "rated operating sequence", text)
    }

    #[test]
    fn a_pause_needs_a_unit() {
        let findings = sequence("O - 0.3 - CO - 3 - CO").of("sequence-malformed");
        let edits: Vec<_> = findings.iter().map(|f| f.edits[0].text.as_str()).collect();
        assert_eq!(edits, ["0.3 s", "3 min"]);
        assert_eq!(sequence("O - t - CO - t' - CO").of("sequence-malformed").len(), 2);
        for good in ["O - 0.3 s - CO - 3 min - CO", "O-3min-CO-3min-CO", "CO - 15 s - CO", "O–0.3 s–CO–1 min–CO"]
        {
            sequence(good).silent("sequence-malformed");
        }
    }

    #[test]
    fn operations_and_pauses_in_turn() {
        sequence("O - 0.3 s - CO - 3 min").one("sequence-malformed");
        sequence("O - CO - CO").one("sequence-malformed");
        sequence("O 0.3 s CO").one("sequence-malformed");
    }

    #[test]
    fn a_scheme_that_recloses_needs_a_short_pause() {
        let finding = sequence("O - 3 min - CO - 3 min - CO").one("sequence-without-rapid-reclosing");
        assert_eq!(finding.edits[0].text, "O - 0.3 s - CO - 3 min - CO");
        sequence("CO - 15 s - CO").one("sequence-without-rapid-reclosing");
        Bay::new().silent("sequence-without-rapid-reclosing");
        sequence("O - 3 min - CO - 3 min - CO")
            .set("circuit", "auto-reclosing", "none")
            .silent("sequence-without-rapid-reclosing");
        let delayed = sequence("O - 3 min - CO - 3 min - CO");
        delayed.clone().set("circuit", "auto-reclosing dead time", "3 min").silent("sequence-without-rapid-reclosing");
        delayed.clone().set("circuit", "auto-reclosing dead time", "170 s").one("sequence-without-rapid-reclosing");
        // One phase that recloses is enough.
        delayed
            .without("circuit", "auto-reclosing")
            .without("circuit", "auto-reclosing dead time")
            .set("circuit", "single-phase dead time", "0.5 s")
            .one("sequence-without-rapid-reclosing");
    }

    #[test]
    fn the_second_pause() {
        assert_eq!(sequence("O - 0.3 s - CO - 15 s - CO").one("sequence-interval").edits[0].text, "3 min");
        sequence("O - 0.3 s - CO - 15 s - CO").set("breaker", "rated voltage", "52 kV").silent("sequence-interval");
        sequence("O - 0.3 s - CO - 15 s - CO").set("breaker", "rated voltage", "72.5 kV").one("sequence-interval");
        sequence("O - 0.3 s - CO - 1 min - CO").silent("sequence-interval");
        sequence("O - 0.3 s - CO - 2 min - CO").one("sequence-interval");
        Bay::new().silent("sequence-interval");
    }

    #[test]
    fn the_dead_time_against_the_pause() {
        Bay::new().set("circuit", "auto-reclosing dead time", "0.25 s").one("dead-time");
        Bay::new().silent("dead-time");
        Bay::new().set("circuit", "single-phase dead time", "0.2 s").one("dead-time");
        Bay::new().set("circuit", "single-phase dead time", "0.3 s").silent("dead-time");
        // The second shot comes after the second pause.
        let second = |after: &str| Bay::new().set("circuit", "second reclosing after", after);
        assert!(second("60 s").one("dead-time").message.contains("180 s"));
        second("180 s").silent("dead-time");
        second("179 s").one("dead-time");
        second("60 s").set("breaker", "rated operating sequence", "O - 0.3 s - CO - 1 min - CO").silent("dead-time");
        Bay::new()
            .set("circuit", "auto-reclosing dead time", "0.25 s")
            .set("circuit", "auto-reclosing", "none")
            .silent("dead-time");
        // 18 to 22 cycles at 60 Hz fit 0.3 s.
        let cycles = |n: &str| {
            Bay::new().set("system", "frequency", "60 Hz").set("breaker", "rated frequency", "60 Hz").set(
                "circuit",
                "auto-reclosing dead time",
                n,
            )
        };
        cycles("18 cycles").silent("dead-time");
        cycles("22 cycles").silent("dead-time");
        cycles("17 cycles").one("dead-time");
    }
}
