//! Rules on clearing, reclosing, simultaneity and endurance of operation.

use super::{Check, EQUAL, Rule, add_line, after};
use crate::case::Case;
use crate::duty::hundreds;
use crate::finding::{Datum, Finding, FindingKind, Findings};
use crate::particular::{Particular, breaker, circuit, system};
use crate::quantity::{Measure, Physical, Time, significant};
use crate::sheet::{Stated, Statement};
use crate::source::Place;
use crate::standards::{class_for_operations, operations_of_class};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &CLEARING_TIME,
    &OPEN_CLOSE_TIME,
    &POLE_SIMULTANEITY,
    &RECHARGE_TIME,
    &MECHANICAL_CLASS,
    &ELECTRICAL_CLASS,
    &CLOSING_SCATTER,
    &BREAK_TIME_UNUSUAL,
    &OPENING_TIME_SENSE,
    &SINGLE_POLE_RECLOSING,
];

fn longest<'a>(case: &'a Case<'_>, particular: &Particular) -> Option<Stated<'a, Time>> {
    case.breaker.greatest(particular)
}

fn ms(seconds: f64) -> String {
    format!("{} ms", significant(seconds * 1e3, 3))
}

/// Relay and breaker clear within what stability allows.
pub static CLEARING_TIME: Rule = Rule {
    name: "clearing-time",
    title: "Relay and breaker clear a fault within the critical clearing time, and neighbours within the breaker-failure time.",
    kind: FindingKind::Shortfall,
    basis: "common practice, no source",
    formula: "relay + break + margin <= critical clearing time; relay + 2 x break + margin <= breaker-failure time",
    explanation: "The margin (20 ms by default) is for the spread of relay and breaker; after a failure the neighbours need their own \
                  break time. Silent without a relay time, a break time or a limit.",
    check: Check::Case(clearing),
};

fn clearing(case: &Case<'_>, findings: &mut Findings) {
    let (Some(relay), Some(total)) =
        (case.system.greatest::<Time>(&system::RELAY_TIME), longest(case, &breaker::BREAK_TIME))
    else {
        return;
    };
    let Some(chain) = case.duty.site.clearing_time.as_ref() else { return };
    let margin = case.policy.clearing_margin;
    let limits = [
        (&system::CRITICAL_CLEARING_TIME, 1.0, "relay + break + margin", "the critical clearing time"),
        (
            &system::BREAKER_FAILURE_TIME,
            2.0,
            "relay + break + break of the neighbours + margin",
            "the breaker-failure time",
        ),
    ];
    for (particular, breaks, formula, name) in limits {
        let Some(limit) = case.system.quantity::<Time>(particular) else { continue };
        // After a failure the neighbours need a break time of their own.
        let sum = chain.value.si() + (breaks - 1.0) * total.value.si();
        if sum <= limit.value.si() * (1.0 + EQUAL) {
            continue;
        }
        let left = (limit.value.si() - relay.value.si() - margin) / breaks;
        let message = format!("{formula} is {}, longer than {name}, {}", ms(sum), limit.measure);
        let terms: Vec<String> = std::iter::once(relay.value.si())
            .chain(std::iter::repeat_n(total.value.si(), breaks as usize))
            .chain(std::iter::once(margin))
            .map(ms)
            .collect();
        let finding = findings.add(&CLEARING_TIME, total.place(), message);
        finding.label("too long for the network").stated(&total.measure);
        finding.working(format!("{formula} = {} = {}", terms.join(" + "), ms(sum)));
        finding.beside(relay.statement, "the relay time").beside(limit.statement, name);
        if left > 0.0 {
            finding.needed(Datum { text: format!("at most {}", ms(left)), si: Some(left) });
        }
        finding.advice("ask for a shorter break time, or a faster protection");
    }
}

/// A circuit that recloses, with the statement that says so.
fn reclosing_line<'a>(case: &'a Case<'_>) -> Option<&'a Statement> {
    case.circuits.iter().find_map(|part| match part.word(&circuit::AUTO_RECLOSING) {
        Some(("none", _)) => None,
        Some((_, statement)) => Some(statement),
        None => part
            .statement(&circuit::AUTO_RECLOSING_DEAD_TIME)
            .or_else(|| part.statement(&circuit::SINGLE_PHASE_DEAD_TIME)),
    })
}

/// The breaker can reclose within the dead time.
pub static OPEN_CLOSE_TIME: Rule = Rule {
    name: "open-close-time",
    title: "The open-close time fits into the dead time of the scheme.",
    kind: FindingKind::Remark,
    basis: "IEC 60050-441 (from memory); common practice",
    formula: "open-close time <= dead time",
    explanation: "From separation to touch the contacts take their time, and the dead time begins later, when the arc is out. Where \
                  the dead time is no longer than the usual 0.3 s and neither open-close nor trip-to-remake time is stated, they \
                  are asked for. Silent where nothing recloses.",
    check: Check::Case(open_close),
};

/// The usual first pause of a sequence, s (IEC 62271-100 5.104, from memory).
const USUAL_PAUSE: f64 = 0.3;

fn open_close(case: &Case<'_>, findings: &mut Findings) {
    let dead = case
        .circuits
        .iter()
        .filter(|part| !matches!(part.word(&circuit::AUTO_RECLOSING), Some(("none", _))))
        .flat_map(|part| {
            [part.quantity::<Time>(&circuit::AUTO_RECLOSING_DEAD_TIME), part.quantity(&circuit::SINGLE_PHASE_DEAD_TIME)]
        })
        .flatten()
        .min_by(|a, b| a.value.si().total_cmp(&b.value.si()));
    let Some(dead) = dead else { return };
    if let Some(stated) = longest(case, &breaker::OPEN_CLOSE_TIME) {
        if stated.value.si() <= dead.value.si() * (1.0 + EQUAL) {
            return;
        }
        let message =
            format!("an open-close time of {} does not fit into the dead time of {}", stated.measure, dead.measure);
        findings
            .add(&OPEN_CLOSE_TIME, stated.place(), message)
            .label("longer than the dead time")
            .stated(&stated.measure)
            .needed(format!("at most {}", dead.measure))
            .beside(dead.statement, "the dead time")
            .advice("ask for a shorter open-close time, or lengthen the dead time");
        return;
    }
    let asked =
        [&breaker::OPEN_CLOSE_TIME, &breaker::TRIP_TO_REMAKE_TIME].into_iter().any(|p| case.breaker.mentions(p));
    if asked || dead.value.si() > USUAL_PAUSE * (1.0 + EQUAL) {
        return;
    }
    let message = format!("the dead time is {}, and no open-close time says that the breaker can follow", dead.measure);
    let finding = findings.add(&OPEN_CLOSE_TIME, dead.place(), message);
    finding.label("can the breaker follow?").related(case.sheet.heading, "the breaker");
    add_line(finding, case.sheet, &breaker::OPEN_CLOSE_TIME, &format!("at most {}", dead.measure));
}

/// Poles operate together.
pub static POLE_SIMULTANEITY: Rule = Rule {
    name: "pole-simultaneity",
    title: "The spread between poles is at most a sixth of a cycle on opening and a quarter on closing.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-100:2021 (from memory)",
    formula: "opening <= 1/(6 f), closing <= 1/(4 f)",
    explanation: "More spread is allowed by no standard, so the value asked for is no requirement. Silent on closing where the poles \
                  are closed one after the other on purpose, by controlled switching.",
    check: Check::Case(simultaneity),
};

/// Shares of a cycle on opening and closing (IEC 62271-100, from memory).
const OPENING_SHARE: f64 = 6.0;
const CLOSING_SHARE: f64 = 4.0;

fn simultaneity(case: &Case<'_>, findings: &mut Findings) {
    let Some(frequency) = case.frequency() else { return };
    let staggered =
        case.breaker.word(&breaker::CONTROLLED_SWITCHING).is_some_and(|(word, _)| word.starts_with("closing"));
    for (what, particular, parts, off) in [
        ("opening", &breaker::POLE_SIMULTANEITY_ON_OPENING, OPENING_SHARE, false),
        ("closing", &breaker::POLE_SIMULTANEITY_ON_CLOSING, CLOSING_SHARE, staggered),
    ] {
        let Some(stated) = longest(case, particular).filter(|_| !off) else { continue };
        let limit = 1.0 / (parts * frequency.si());
        if stated.value.si() <= limit * (1.0 + EQUAL) + stated.measure.half_last_digit() {
            continue;
        }
        // Rounded down, so that the repair keeps the limit.
        let text = format!("{:.1} ms", (limit * 1e4).floor() / 10.0);
        let message = format!(
            "a spread of {} on {what} is more than 1/{} of a cycle at {}, {text}",
            stated.measure,
            significant(parts, 1),
            frequency.show()
        );
        findings
            .add(&POLE_SIMULTANEITY, stated.place(), message)
            .label("more than the standard allows")
            .stated(&stated.measure)
            .needed(Datum { text: text.clone(), si: Some(limit) })
            .working(format!("1 / ({} x {}) = {}", significant(parts, 1), frequency.show(), ms(limit)))
            .replace_by(text);
    }
}

/// The drive is charged before it is needed again.
pub static RECHARGE_TIME: Rule = Rule {
    name: "recharge-time",
    title: "The energy of the drive is restored before the last closing of the sequence.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-100:2021 5.104 (from memory)",
    formula: "charging time <= last pause of the sequence",
    explanation: "After O - CO the store is empty and has to be full again for the last CO. Silent without a sequence of times or a \
                  charging time.",
    check: Check::Case(recharge),
};

fn recharge(case: &Case<'_>, findings: &mut Findings) {
    let (Some(charging), Some((sequence, statement))) =
        (longest(case, &breaker::SPRING_CHARGING_TIME), case.breaker.sequence(&breaker::RATED_OPERATING_SEQUENCE))
    else {
        return;
    };
    let Some(pause) = sequence.pauses().last().and_then(|pause| pause.measure) else { return };
    let Some(limit) = pause.to::<Time>() else { return };
    if charging.value.si() <= limit.si() * (1.0 + EQUAL) {
        return;
    }
    let message = format!("charging takes {}, and the sequence {sequence} leaves {pause}", charging.measure);
    findings
        .add(&RECHARGE_TIME, charging.place(), message)
        .label("longer than the pause")
        .stated(&charging.measure)
        .needed(Datum::from(&pause))
        .beside(statement, "the operating sequence")
        .advice("or ask for the sequence with the longer pause")
        .replace_by(pause.to_string());
}

/// Why a figure of operations belongs to a finding, beside the line that says how often.
pub(super) const HOW_OFTEN: &str = "how often it is switched";

/// The class of mechanical endurance covers the operations.
pub static MECHANICAL_CLASS: Rule = Rule {
    name: "mechanical-class",
    title: "The class of mechanical endurance covers the operations over the service life.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-100:2021 classes M1, M2 (from memory)",
    formula: "operations a day x 365 x years <= 2000 (M1) or 10 000 (M2)",
    explanation: "Without a class M1 is offered. The years are those of the tender's service life, else 30. Above 10 000 no class \
                  covers them. Silent where no circuit says how often it is switched, and for furnaces, traction and pumped \
                  storage, of which operations-endurance speaks.",
    check: Check::Case(mechanical),
};

/// Circuits that are switched so often that they have a rule of their own.
pub(super) const FREQUENT: [&str; 3] = ["arc furnace", "traction", "pumped storage"];

fn mechanical(case: &Case<'_>, findings: &mut Findings) {
    if case.circuits_of(&FREQUENT).next().is_some() {
        return;
    }
    let Some(operations) = case.duty.switching.operations.as_ref() else { return };
    let class = case.breaker.class(&breaker::CLASSES, 'M');
    let unreadable = case.breaker.mentions(&breaker::CLASSES) && case.breaker.classes(&breaker::CLASSES).is_none();
    let grade = class.map_or(1, |(class, _)| class.grade);
    let Some(covered) = operations_of_class(grade).filter(|_| !unreadable) else { return };
    let (count, how_often) = (operations.value.si(), operations.places().next());
    if count <= covered {
        return;
    }
    let shown = hundreds(count);
    let needed = class_for_operations(count);
    let stated = if class.is_some() { format!("M{grade}") } else { "no class M".to_owned() };
    let message = match needed {
        Some(needed) => format!("{shown} operations over the life are more than {stated} is tested for: M{needed}"),
        None => {
            format!("{shown} operations over the life are more than M2 is tested for, 10 000: no class covers them")
        }
    };
    let place = class.map(|(class, _)| class.place).or(how_often).unwrap_or(case.sheet.heading);
    let finding = findings.add(&MECHANICAL_CLASS, place, message);
    finding.label("more operations than tested").stated(stated).working(operations.working.to_string());
    if let Some(place) = how_often.filter(|_| class.is_some()) {
        finding.related(place, HOW_OFTEN);
    }
    match needed {
        Some(needed) => set_class(finding, case, class.map(|(class, _)| class.place), &format!("M{needed}")),
        None => {
            finding.advice("state the number of operations that are to be tested, or plan for an overhaul");
        }
    }
}

/// The edit that puts a class in place of another of its letter, or adds it.
fn set_class(finding: &mut Finding, case: &Case<'_>, old: Option<Place>, class: &str) {
    finding.needed(class);
    if let Some(old) = old {
        finding.edit(format!("write {class}"), old, class);
    } else if let Some(list) = case.breaker.statement(&breaker::CLASSES) {
        finding.edit(format!("add {class}"), after(list.value), format!(", {class}"));
    } else {
        add_line(finding, case.sheet, &breaker::CLASSES, class);
    }
}

/// Breakers that reclose up to 52 kV are of class E2.
pub static ELECTRICAL_CLASS: Rule = Rule {
    name: "electrical-class",
    title: "Up to 52 kV, a breaker that recloses an overhead line is of class E2.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-100:2021 classes E1, E2 (from memory)",
    formula: "auto-reclosing and Ur <= 52 kV: E2",
    explanation: "Overhead lines reclose many times a year on faults, and class E2 has the test of interruptions for it. E2 without \
                  reclosing is more than needed and not wrong. Silent above 52 kV, where the classes end, and where only standards \
                  of the IEEE are cited.",
    check: Check::Case(electrical),
};

/// The classes of electrical endurance are for rated voltages up to here (IEC 62271-100, from memory).
const ENDURANCE_CLASSES_TO: f64 = 52e3;

fn electrical(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(scheme)) = (case.rated_voltage(), reclosing_line(case)) else { return };
    if rated.value.si() > ENDURANCE_CLASSES_TO * (1.0 + EQUAL) || case.regimes().only_ieee() {
        return;
    }
    let class = case.breaker.class(&breaker::CLASSES, 'E');
    let unreadable = case.breaker.mentions(&breaker::CLASSES) && case.breaker.classes(&breaker::CLASSES).is_none();
    if unreadable || class.is_some_and(|(class, _)| class.grade >= 2) {
        return;
    }
    let stated = class.map_or_else(|| "no class E".to_owned(), |(class, _)| class.to_string());
    let message =
        format!("the circuit recloses at {}, for which class E2 is made; {stated} is asked for", rated.measure);
    let place = class.map_or_else(
        || case.breaker.statement(&breaker::CLASSES).map_or(case.sheet.heading, |list| list.value),
        |(class, _)| class.place,
    );
    let finding = findings.add(&ELECTRICAL_CLASS, place, message);
    finding.label("not the class for reclosing").stated(stated).beside(scheme, "the scheme that recloses");
    set_class(finding, case, class.map(|(class, _)| class.place), "E2");
}

/// Controlled switching has its scatter.
pub static CLOSING_SCATTER: Rule = Rule {
    name: "closing-scatter",
    title: "Where operations are controlled, the scatter of the closing time is bounded.",
    kind: FindingKind::Remark,
    basis: "IEC/TR 62271-302 (from memory)",
    formula: "closing time scatter stated where controlled switching is asked for",
    explanation: "A controller can aim no better than the breaker repeats itself, over temperature, supply voltage and rest. Silent \
                  where no controlled switching is asked for.",
    check: Check::Case(scatter),
};

/// A scatter that controllers can live with (common practice, no source).
const USUAL_SCATTER: &str = "at most 1 ms";

fn scatter(case: &Case<'_>, findings: &mut Findings) {
    let Some((word, statement)) = case.breaker.word(&breaker::CONTROLLED_SWITCHING).filter(|(word, _)| *word != "none")
    else {
        return;
    };
    if case.breaker.mentions(&breaker::CLOSING_TIME_SCATTER) {
        return;
    }
    let message = format!("controlled {word} is asked for, and the scatter of the operating time is not bounded");
    let finding = findings.add(&CLOSING_SCATTER, statement.value, message);
    finding.label("how exactly?").needed(USUAL_SCATTER);
    add_line(finding, case.sheet, &breaker::CLOSING_TIME_SCATTER, USUAL_SCATTER);
}

/// A break time is one that breakers have.
pub static BREAK_TIME_UNUSUAL: Rule = Rule {
    name: "break-time-unusual",
    title: "The break time is not shorter than that of any class.",
    kind: FindingKind::Caution,
    basis: "IEEE C37.04 interrupting times (from memory)",
    formula: "break time >= 2 cycles",
    explanation: "2-cycle breakers are the fastest that are made for sale. A shorter time is more often the arcing or the opening \
                  time. Silent where the frequency is not known, and where the opening time is as long.",
    check: Check::Case(unusual),
};

/// The shortest break time of a class, cycles (IEEE C37.04, from memory).
const SHORTEST_BREAK: f64 = 2.0;

fn unusual(case: &Case<'_>, findings: &mut Findings) {
    let (Some(total), Some(frequency)) = (longest(case, &breaker::BREAK_TIME), case.frequency()) else { return };
    let least = SHORTEST_BREAK / frequency.si();
    // Not longer than the opening time, it is told by break-time-below-opening.
    let told = longest(case, &breaker::OPENING_TIME)
        .is_some_and(|opening| total.value.si() <= opening.value.si() * (1.0 + EQUAL));
    if told || total.value.si() + total.measure.half_last_digit() >= least * (1.0 - EQUAL) {
        return;
    }
    let message = format!(
        "a break time of {} is shorter than 2 cycles at {}, {}, which is the shortest class",
        total.measure,
        frequency.show(),
        ms(least)
    );
    findings
        .add(&BREAK_TIME_UNUSUAL, total.place(), message)
        .label("shorter than any class")
        .stated(&total.measure)
        .needed(Datum { text: format!("at least {}", ms(least)), si: Some(least) })
        .working(format!("2 / {} = {}", frequency.show(), ms(least)))
        .advice("look whether the opening time is meant; else state 2 cycles");
}

/// An opening time says which end is meant.
pub static OPENING_TIME_SENSE: Rule = Rule {
    name: "opening-time-sense",
    title: "The opening time says whether it is the least or the greatest.",
    kind: FindingKind::Remark,
    basis: "IEC 62271-100:2021 5.101 (from memory); common practice",
    formula: "least opening time for the DC component, greatest for clearing",
    explanation: "The least opening time decides how much DC is left at separation, the greatest how long a fault lasts. Silent on a \
                  range, and on a value with at least, at most, minimum or maximum.",
    check: Check::Case(sense),
};

fn sense(case: &Case<'_>, findings: &mut Findings) {
    let mut all = case.breaker.all(&breaker::OPENING_TIME);
    let (Some(statement), None) = (all.next(), all.next()) else { return };
    let Some(reading) = statement.quantity() else { return };
    if statement.limit.is_some() || reading.bound.is_some() || reading.is_range() || reading.tolerance.is_some() {
        return;
    }
    let shown: &Measure = &reading.measure;
    findings
        .add(&OPENING_TIME_SENSE, statement.value, format!("an opening time of {shown}: the least or the greatest?"))
        .label("least or greatest?")
        .stated(shown)
        .advice("write it as a range: the least counts for the DC component, the greatest for clearing")
        .edit(format!("write at most {shown}"), statement.value, format!("at most {shown}"))
        .edit(format!("write at least {shown}"), statement.value, format!("at least {shown}"));
}

/// Single-phase reclosing has single-pole drives.
pub static SINGLE_POLE_RECLOSING: Rule = Rule {
    name: "single-pole-reclosing",
    title: "Where one phase recloses, each pole has its drive.",
    kind: FindingKind::Contradiction,
    basis: "common practice, no source",
    formula: "single-phase reclosing: pole operation single-pole, with pole discrepancy protection",
    explanation: "One drive for three poles cannot open one of them. Where the operation of the poles or their discrepancy \
                  protection is not stated, it is a remark. Silent where no circuit recloses a single phase.",
    check: Check::Case(single_pole),
};

fn single_pole(case: &Case<'_>, findings: &mut Findings) {
    let scheme = case.circuits.iter().find_map(|part| match part.word(&circuit::AUTO_RECLOSING) {
        Some((word, statement)) => word.starts_with("single-phase").then_some(statement),
        None => part.statement(&circuit::SINGLE_PHASE_DEAD_TIME),
    });
    let Some(scheme) = scheme else { return };
    match case.breaker.word(&breaker::POLE_OPERATION) {
        Some(("three-pole", poles)) => {
            findings
                .add(
                    &SINGLE_POLE_RECLOSING,
                    poles.value,
                    "one phase recloses, and one drive for three poles cannot open it alone",
                )
                .label("cannot open one pole")
                .stated("three-pole")
                .needed("single-pole")
                .beside(scheme, "the scheme")
                .advice("pole discrepancy protection comes with it")
                .replace_by("single-pole");
            return;
        }
        None if !case.breaker.mentions(&breaker::POLE_OPERATION) => {
            let message = "one phase recloses, and it is not said that each pole has its drive";
            let finding = findings.add(&SINGLE_POLE_RECLOSING, scheme.value, message);
            finding
                .kind(FindingKind::Remark)
                .label("a drive for each pole?")
                .related(case.sheet.heading, "the breaker");
            finding.needed("single-pole");
            add_line(finding, case.sheet, &breaker::POLE_OPERATION, "single-pole");
        }
        _ => {}
    }
    if !case.breaker.mentions(&breaker::POLE_DISCREPANCY_PROTECTION) {
        let message = "poles that move alone can be left apart, and no pole discrepancy protection is asked for";
        let finding = findings.add(&SINGLE_POLE_RECLOSING, scheme.value, message);
        finding.kind(FindingKind::Remark).label("what if a pole is left behind?");
        finding.related(case.sheet.heading, "the breaker").needed("yes");
        add_line(finding, case.sheet, &breaker::POLE_DISCREPANCY_PROTECTION, "yes");
    }
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    #[test]
    fn clearing_within_the_critical_time() {
        let bay = |relay: &str, critical: &str| {
            Bay::new().set("system", "relay time", relay).set("system", "critical clearing time", critical).set(
                "breaker",
                "break time",
                "60 ms",
            )
        };
        let finding = bay("30 ms", "100 ms").one("clearing-time");
        assert_eq!(finding.kind, FindingKind::Shortfall);
        assert!(finding.working[0].ends_with("30 ms + 60 ms + 20 ms = 110 ms"), "{:?}", finding.working);
        bay("20 ms", "100 ms").silent("clearing-time");
        Bay::new().silent("clearing-time");
        let failure = bay("20 ms", "120 ms").set("system", "breaker-failure time", "150 ms");
        assert!(failure.one("clearing-time").message.contains("160 ms"));
        failure.set("system", "breaker-failure time", "160 ms").silent("clearing-time");
    }

    #[test]
    fn closing_again_within_the_dead_time() {
        let finding = Bay::new().without("breaker", "open-close time").one("open-close-time");
        assert_eq!(finding.kind, FindingKind::Remark);
        assert_eq!(finding.edits[0].text, "\n    open-close time: at most 0.3 s");
        Bay::new().set("breaker", "open-close time", "300 ms").silent("open-close-time");
        Bay::new().set("breaker", "open-close time", "320 ms").one("open-close-time");
        Bay::new()
            .without("breaker", "open-close time")
            .set("circuit", "auto-reclosing dead time", "0.5 s")
            .silent("open-close-time");
    }

    #[test]
    fn poles_together() {
        let finding = Bay::new().set("breaker", "pole simultaneity on opening", "6 ms").one("pole-simultaneity");
        assert_eq!(finding.edits[0].text, "3.3 ms");
        Bay::new().set("breaker", "pole simultaneity on opening", "3.3 ms").silent("pole-simultaneity");
        Bay::new().set("breaker", "pole simultaneity on closing", "5 ms").silent("pole-simultaneity");
        let closing = Bay::new().set("breaker", "pole simultaneity on closing", "6.7 ms");
        closing.one("pole-simultaneity");
        closing.set("breaker", "controlled switching", "closing").silent("pole-simultaneity");
    }

    #[test]
    fn charged_before_the_last_closing() {
        let bay = |time: &str| {
            Bay::new().set("breaker", "spring charging time", time).set(
                "breaker",
                "rated operating sequence",
                "O - 0.3 s - CO - 15 s - CO",
            )
        };
        assert_eq!(bay("20 s").one("recharge-time").edits[0].text, "15 s");
        bay("15 s").silent("recharge-time");
        Bay::new().set("breaker", "spring charging time", "20 s").silent("recharge-time");
    }

    #[test]
    fn operations_over_the_life() {
        let bay = |a_day: &str, classes: &str| {
            Bay::new().set("circuit", "operations per day", a_day).set("breaker", "classes", classes).set(
                "tender",
                "service life",
                "25 years",
            )
        };
        let finding = bay("1 per day", "C2, M1").one("mechanical-class");
        assert!(finding.message.contains("9100"), "{}", finding.message);
        assert_eq!(finding.edits[0].text, "M2");
        bay("1 per day", "C2, M2").silent("mechanical-class");
        assert_eq!(bay("1 per day", "C2").one("mechanical-class").edits[0].text, ", M2");
        let beyond = bay("2 per day", "C2, M2").one("mechanical-class");
        assert!(beyond.edits.is_empty() && beyond.message.contains("no class"), "{}", beyond.message);
        bay("0.2 per day", "C2, M1").silent("mechanical-class");
        Bay::new().silent("mechanical-class");
    }

    #[test]
    fn reclosing_up_to_52_kv() {
        let bay =
            |ur: &str, classes: &str| Bay::new().set("breaker", "rated voltage", ur).set("breaker", "classes", classes);
        assert_eq!(bay("36 kV", "C2, E1, M2").one("electrical-class").edits[0].text, "E2");
        assert_eq!(bay("52 kV", "C2, M2").one("electrical-class").edits[0].text, ", E2");
        bay("36 kV", "C2, E2, M2").silent("electrical-class");
        bay("72.5 kV", "C2, M2").silent("electrical-class");
        bay("36 kV", "C2, E1").set("circuit", "auto-reclosing", "none").silent("electrical-class");
    }

    #[test]
    fn controlled_switching_needs_its_scatter() {
        let bay = Bay::new().set("breaker", "controlled switching", "closing");
        bay.one("closing-scatter");
        bay.set("breaker", "closing time scatter", "1 ms").silent("closing-scatter");
        Bay::new().set("breaker", "controlled switching", "none").silent("closing-scatter");
        Bay::new().silent("closing-scatter");
    }

    #[test]
    fn break_times_of_no_class() {
        let bay =
            |time: &str| Bay::new().set("breaker", "break time", time).set("breaker", "opening time", "12 to 15 ms");
        Bay::new().set("breaker", "break time", "25 ms").silent("break-time-unusual");
        assert_eq!(bay("25 ms").one("break-time-unusual").kind, FindingKind::Caution);
        bay("40 ms").silent("break-time-unusual");
        bay("2 cycles").silent("break-time-unusual");
        bay("33 ms")
            .set("breaker", "rated frequency", "60 Hz")
            .set("system", "frequency", "60 Hz")
            .silent("break-time-unusual");
    }

    #[test]
    fn least_or_greatest_opening_time() {
        let bay = |time: &str| Bay::new().set("breaker", "opening time", time);
        assert_eq!(bay("30 ms").one("opening-time-sense").edits.len(), 2);
        bay("at most 30 ms").silent("opening-time-sense");
        bay("25 to 30 ms").silent("opening-time-sense");
        bay("30 ms +- 2 ms").silent("opening-time-sense");
    }

    #[test]
    fn one_phase_recloses() {
        let bay = || Bay::new().set("circuit", "auto-reclosing", "single-phase and three-phase");
        let gang = bay().set("breaker", "pole operation", "three-pole").one("single-pole-reclosing");
        assert_eq!((gang.kind, gang.edits[0].text.as_str()), (FindingKind::Contradiction, "single-pole"));
        let poles = bay().set("breaker", "pole operation", "single-pole");
        assert_eq!(poles.one("single-pole-reclosing").kind, FindingKind::Remark);
        poles.set("breaker", "pole discrepancy protection", "yes").silent("single-pole-reclosing");
        assert_eq!(bay().of("single-pole-reclosing").len(), 2);
        Bay::new().set("breaker", "pole operation", "three-pole").silent("single-pole-reclosing");
    }
}
