//! Rules on the times of operation.

use super::{Check, EQUAL, Rule};
use crate::case::{Case, Part};
use crate::finding::{FindingKind, Findings};
use crate::particular::breaker;
use crate::quantity::{Dimension, Physical, Time, significant};
use crate::sheet::Reading;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&BREAK_TIME_BELOW_OPENING, &CYCLES_DISAGREE];

/// The break time is longer than the opening time.
pub static BREAK_TIME_BELOW_OPENING: Rule = Rule {
    name: "break-time-below-opening",
    title: "The break time is longer than the opening time.",
    kind: FindingKind::Contradiction,
    basis: "IEC 60050-441, IEC/TR 62271-306 (from memory)",
    formula: "break time = opening time + arcing time",
    explanation: "The arc lasts some milliseconds after the contacts part, so the break time cannot be as short as the longest \
                  opening time that is admitted.",
    check: Check::Case(break_time),
};

fn break_time(case: &Case<'_>, findings: &mut Findings) {
    let (Some(total), Some(opening)) =
        (case.breaker.greatest::<Time>(&breaker::BREAK_TIME), case.breaker.greatest::<Time>(&breaker::OPENING_TIME))
    else {
        return;
    };
    if total.value.si() > opening.value.si() * (1.0 + EQUAL) {
        return;
    }
    let message = format!(
        "a break time of {} leaves no time for the arc after an opening time of {}",
        total.measure, opening.measure
    );
    findings
        .add(&BREAK_TIME_BELOW_OPENING, total.place(), message)
        .label("not longer than the opening time")
        .stated(&total.measure)
        .working("break time = opening time + arcing time")
        .beside(opening.statement, "the opening time")
        .advice("the two may be swapped; else state the longer break time or the shorter opening time");
}

/// Cycles and milliseconds of one statement agree.
pub static CYCLES_DISAGREE: Rule = Rule {
    name: "cycles-disagree",
    title: "Cycles and milliseconds of one statement agree at the rated frequency.",
    kind: FindingKind::Contradiction,
    basis: "arithmetic",
    formula: "n cycles = n / f",
    explanation: "3 cycles are 50 ms at 60 Hz and 60 ms at 50 Hz. Compared within 1 % or half a unit of the last digit written. A \
                  statement that fits the other frequency was copied from elsewhere.",
    check: Check::Case(cycles),
};

fn cycles(case: &Case<'_>, findings: &mut Findings) {
    let Some(frequency) = case.frequency() else { return };
    let parts: Vec<&Part<'_>> = [&case.breaker, &case.system].into_iter().chain(&case.circuits).collect();
    for statement in parts.iter().flat_map(|part| part.statements()) {
        let Reading::Quantity(quantity) = &statement.reading else { continue };
        for again in &quantity.again {
            let (first, second) = (&quantity.measure, &again.measure);
            if first.dimension() != Dimension::Time || first.unit.counts_cycles() == second.unit.counts_cycles() {
                continue;
            }
            let (Some(a), Some(b)) = (first.si, second.si) else { continue };
            // A whole number of cycles is meant exactly; only the milliseconds are rounded.
            let slack =
                (case.policy.dual_tolerance * a.abs()).max(first.half_last_digit()).max(second.half_last_digit());
            if (a - b).abs() <= slack * (1.0 + EQUAL) {
                continue;
            }
            let (counted, timed) = if first.unit.counts_cycles() { (first, second) } else { (second, first) };
            let right = Time::from_si(counted.number / frequency.si());
            let text = timed.show_like(right.si());
            let message = format!("{counted} are {text} at {}, not {timed}", frequency.show());
            let place = if first.unit.counts_cycles() { again.place } else { quantity.place };
            findings
                .add(&CYCLES_DISAGREE, place, message)
                .label("does not agree with the cycles")
                .stated(timed)
                .needed(text.as_str())
                .working(format!("{} / {} = {text}", significant(counted.number, 4), frequency.show()))
                .replace_by(text);
        }
    }
}

#[cfg(test)]
mod tests {
    use crate::rules::testing::Bay;

    #[test]
    fn the_arc_takes_time() {
        Bay::new().set("breaker", "break time", "28 ms").one("break-time-below-opening");
        Bay::new().silent("break-time-below-opening");
        Bay::new().set("breaker", "break time", "30 ms").one("break-time-below-opening");
        Bay::new().set("breaker", "break time", "31 ms").silent("break-time-below-opening");
        Bay::new().set("breaker", "break time", "2 cycles").silent("break-time-below-opening");
    }

    #[test]
    fn cycles_at_the_rated_frequency() {
        let at = |hertz: &str, time: &str| {
            Bay::new().set("system", "frequency", hertz).set("breaker", "rated frequency", hertz).set(
                "breaker",
                "break time",
                time,
            )
        };
        assert_eq!(at("60 Hz", "5 cycles (100 ms)").one("cycles-disagree").edits[0].text, "83.3 ms");
        at("50 Hz", "5 cycles (100 ms)").silent("cycles-disagree");
        at("60 Hz", "3 cycles (50 ms)").silent("cycles-disagree");
        at("60 Hz", "5 cycles (83 ms)").silent("cycles-disagree");
        at("60 Hz", "5 cycles (84 ms)").silent("cycles-disagree");
        at("60 Hz", "5 cycles (85 ms)").one("cycles-disagree");
        at("60 Hz", "60 ms (3 cycles)").one("cycles-disagree");
    }
}
