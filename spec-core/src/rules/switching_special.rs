//! Rules on what is switched beside plain lines: reactors, filters, transformers, motors, compensated and reclosing circuits.

use super::several_breakers::copied_lines;
use super::timing::FREQUENT;
use super::{Check, EQUAL, Rule, add_line, after};
use crate::case::{Case, Part};
use crate::duty::hundreds;
use crate::finding::{FindingKind, Findings};
use crate::particular::{Particular, breaker, circuit, system, tender};
use crate::quantity::{ElectricCurrent, ElectricPotential, ElectricalResistance, Length, Physical, Power, significant};
use crate::sheet::{Facts, Statement};
use crate::standards::Citation;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &SHUNT_REACTOR_STANDARD,
    &FILTER_BANK,
    &TRANSFORMER_ENERGISING,
    &MOTOR_SWITCHING,
    &COMPENSATED_CABLE,
    &CLOSING_RESISTOR_INCOMPLETE,
    &RECLOSING_MISPLACED,
    &OPERATIONS_ENDURANCE,
    &RESTRIKE_CLASS,
    &CAPACITIVE_RATING_NEEDLESS,
];

/// The kind of a circuit with the line that states it.
pub(super) fn kind_of<'a>(part: &'a Part<'_>) -> Option<(&'static str, &'a Statement)> {
    part.word(&circuit::KIND)
}

/// Measures against overvoltages, of the breaker or at the circuit.
pub(super) fn mitigation(case: &Case<'_>, part: &Facts) -> bool {
    case.breaker.mentions(&breaker::OVERVOLTAGE_MITIGATION)
        || part.mentions(&circuit::SURGE_PROTECTION)
        || case.breaker.word(&breaker::CONTROLLED_SWITCHING).is_some_and(|(word, _)| word != "none")
}

/// Whether one of these words stands among the measures of the breaker or of the circuit.
pub(super) fn has_measure(case: &Case<'_>, part: &Facts, wanted: &[&str]) -> bool {
    let among = |found: Option<(&[&'static str], &Statement)>| {
        found.is_some_and(|(words, _)| words.iter().any(|w| wanted.contains(w)))
    };
    among(case.breaker.words(&breaker::OVERVOLTAGE_MITIGATION)) || among(part.words(&circuit::SURGE_PROTECTION))
}

/// The nominal voltage of the system, else its highest.
fn voltage(case: &Case<'_>) -> Option<ElectricPotential> {
    let nominal = case.system.quantity::<ElectricPotential>(&system::NOMINAL_VOLTAGE).map(|u| u.value);
    nominal.or_else(|| case.duty.system_voltage.as_ref().map(|figure| figure.value))
}

/// The bay of a shunt reactor has its standard and its measures.
pub static SHUNT_REACTOR_STANDARD: Rule = Rule {
    name: "shunt-reactor-standard",
    title: "The bay of a shunt reactor cites the standard of inductive load switching, and a measure against overvoltages.",
    kind: FindingKind::Omission,
    basis: "IEC 62271-110, IEEE C37.015 (from memory)",
    formula: "62271-110 or C37.015 cited; controlled opening, arresters or another measure stated",
    explanation: "Breaking a small inductive current chops and reignites, of which part 100 has no test. A measure that is none is \
                  accepted as a choice. Silent where no circuit is a shunt reactor.",
    check: Check::Case(reactor),
};

/// The standards of inductive load switching.
const INDUCTIVE: [&str; 2] = ["62271-110", "C37.015"];

/// The list of standards that holds for the breaker.
fn standards<'a>(case: &'a Case<'_>) -> Option<(&'a [crate::sheet::Item], &'a Statement)> {
    case.breaker.list(&breaker::STANDARDS).or_else(|| case.tender.list(&tender::STANDARDS))
}

fn cites_inductive(case: &Case<'_>) -> bool {
    standards(case).is_some_and(|(items, _)| {
        items.iter().filter_map(|item| Citation::read(&item.text)).any(|c| INDUCTIVE.contains(&c.number.as_str()))
    })
}

fn reactor(case: &Case<'_>, findings: &mut Findings) {
    let Some(part) = case.circuits_of(&["shunt reactor"]).next() else { return };
    let Some((_, kind)) = kind_of(part) else { return };
    let (cited, measured) = (cites_inductive(case), mitigation(case, part));
    if cited && measured {
        return;
    }
    let standard = if case.regimes().only_ieee() { "IEEE C37.015" } else { "IEC 62271-110" };
    let missing: Vec<String> = [
        (!cited).then(|| format!("{standard}, the standard for it")),
        (!measured).then(|| "a measure against overvoltages".to_owned()),
    ]
    .into_iter()
    .flatten()
    .collect();
    let message = format!("a shunt reactor is switched without {}", missing.join(" and without "));
    let finding = findings.add(&SHUNT_REACTOR_STANDARD, kind.value, message);
    finding.label("not a duty of part 100").needed(missing.join(" and ")).related(case.sheet.heading, "the breaker");
    let switching = &case.duty.switching;
    if let Some(current) = switching.reactor_current.as_ref() {
        finding.working(current.working.to_string());
    }
    if let Some(overvoltage) = switching.chopping_overvoltage.as_ref() {
        finding.working(overvoltage.working.to_string());
    }
    if let (false, Some((_, list))) = (cited, standards(case)) {
        finding.edit(format!("cite {standard}"), after(list.value), format!(", {standard}"));
    }
    if !measured {
        finding.advice("add overvoltage mitigation: controlled opening, or surge arresters");
    }
}

/// A filter bank says what it is tuned to.
pub static FILTER_BANK: Rule = Rule {
    name: "filter-bank",
    title: "A filter bank states the frequency that it is tuned to.",
    kind: FindingKind::Caution,
    basis: "IEC/TR 62271-306 (from memory)",
    formula: "tuning frequency stated",
    explanation: "The reactor of a filter lowers the inrush, and harmonics on the bank raise the recovery voltage above that of a plain \
                  bank. Silent on plain capacitor banks.",
    check: Check::Case(filter),
};

fn filter(case: &Case<'_>, findings: &mut Findings) {
    for part in case.circuits_of(&["filter bank"]) {
        let Some((_, kind)) = kind_of(part).filter(|_| !part.mentions(&circuit::TUNING_FREQUENCY)) else { continue };
        findings
            .add(
                &FILTER_BANK,
                kind.value,
                "a filter bank is switched, and the frequency that it is tuned to is not stated: its recovery voltage is higher \
                 than that of a plain bank",
            )
            .label("tuned to what?")
            .advice("add tuning frequency, and ask for the recovery voltage of the filter in the offer");
    }
}

/// Energising a transformer in a weak network.
pub static TRANSFORMER_ENERGISING: Rule = Rule {
    name: "transformer-energising",
    title: "Where the network is weak, it is said how the inrush of a transformer is limited.",
    kind: FindingKind::Remark,
    basis: "IEC/TR 62271-302 (from memory); common practice",
    formula: "sqrt3 U Ik''/Sr >= 20, or controlled closing, closing resistor, or residual flux control stated",
    explanation: "Inrush lowers the voltage of a weak network. Silent where the short-circuit power is 20 times that of the transformer \
                  or more, where either is not stated, and where a measure is.",
    check: Check::Case(energising),
};

/// Up to this ratio of short-circuit power to transformer power a network is weak (common practice, no source).
const WEAK: f64 = 20.0;

fn energising(case: &Case<'_>, findings: &mut Findings) {
    let (Some(duty), Some(nominal)) = (case.duty.short_circuit_current.as_ref(), voltage(case)) else { return };
    let closing =
        case.breaker.word(&breaker::CONTROLLED_SWITCHING).is_some_and(|(word, _)| word.starts_with("closing"));
    if closing || case.breaker.mentions(&breaker::CLOSING_RESISTOR) {
        return;
    }
    for part in case.circuits_of(&["transformer"]) {
        let Some(power) = part.quantity::<Power>(&circuit::RATED_POWER) else { continue };
        let level: Power = nominal * duty.value * 3f64.sqrt();
        let ratio = level.si() / power.value.si();
        let measured = part.mentions(&circuit::RESIDUAL_FLUX_CONTROL)
            || has_measure(case, part, &["controlled closing", "closing resistor"]);
        if ratio >= WEAK * (1.0 - EQUAL) || measured {
            continue;
        }
        let message = format!(
            "the network is {} times as strong as the transformer of {}: its inrush will be felt",
            significant(ratio, 2),
            power.measure
        );
        let finding = findings.add(&TRANSFORMER_ENERGISING, power.place(), message);
        finding.label("what limits the inrush?");
        finding.working(format!(
            "sqrt3 x {} x {} / {} = {}",
            nominal.show(),
            duty.value.show(),
            power.measure,
            significant(ratio, 2)
        ));
        for place in duty.places() {
            finding.related(place, "the network");
        }
        finding.advice(
            "consider controlled switching: closing, with residual flux control; or state that a study found no need",
        );
    }
}

/// Motors have their breaking current.
pub static MOTOR_SWITCHING: Rule = Rule {
    name: "motor-switching",
    title: "A breaker of a motor states the motor current that it breaks.",
    kind: FindingKind::Omission,
    basis: "IEC 62271-110 (from memory)",
    formula: "motor breaking current stated",
    explanation: "Breaking a starting or stalled motor is the hardest of its duties, with reignitions up to the insulation of the first \
                  turns. Silent where no circuit is a motor; of surges by vacuum speaks vacuum-surge-protection.",
    check: Check::Case(motor),
};

fn motor(case: &Case<'_>, findings: &mut Findings) {
    if case.breaker.mentions(&breaker::MOTOR_BREAKING_CURRENT) {
        return;
    }
    for part in case.circuits_of(&["motor"]) {
        let Some((_, kind)) = kind_of(part) else { continue };
        let finding = findings.add(&MOTOR_SWITCHING, kind.value, "a motor is switched without its breaking current");
        finding.label("a starting motor may have to be broken").related(case.sheet.heading, "the breaker");
        match part.quantity::<ElectricCurrent>(&circuit::STARTING_CURRENT) {
            Some(start) => {
                finding.needed(&start.measure).beside(start.statement, "the starting current");
                add_line(finding, case.sheet, &breaker::MOTOR_BREAKING_CURRENT, &start.measure.to_string());
            }
            None => {
                finding.advice("add motor breaking current with the starting current of the motor");
            }
        }
    }
}

/// Compensated cables have no current zero at first.
pub static COMPENSATED_CABLE: Rule = Rule {
    name: "compensated-cable",
    title: "A cable that is closed in with more than half of its charging power compensated has a measure against missing zeros.",
    kind: FindingKind::Caution,
    basis: "public literature on energising compensated cables (2008 to 2010); IEC/TR 62271-306 (from memory)",
    formula: "Q of the reactors / (w C' l U2) <= 50 %, or controlled closing, closing resistor or staggered switching",
    explanation: "The DC offset of the reactors outlasts the small resulting current, so that no zero comes and the breaker cannot open. \
                  Silent where the reactors are switched by themselves, and where the charging power cannot be reckoned.",
    check: Check::Case(compensated),
};

/// Above this share the resulting current is smaller than the DC offset of the reactors (public literature).
const COMPENSATED: f64 = 0.5;

fn charging_power(case: &Case<'_>, part: &Facts) -> Option<(Power, String)> {
    let nominal = voltage(case)?;
    if let Some(current) = part.quantity::<ElectricCurrent>(&circuit::CHARGING_CURRENT) {
        // In a mixed circuit it is that of the overhead part.
        let cable = part.quantity::<ElectricCurrent>(&circuit::CABLE_SECTION_CHARGING_CURRENT);
        let whole = cable.as_ref().map_or(current.value, |cable| current.value + cable.value);
        let shown = cable
            .map_or_else(|| current.measure.to_string(), |cable| format!("({} + {})", current.measure, cable.measure));
        let power: Power = nominal * whole * 3f64.sqrt();
        return Some((power, format!("sqrt3 x {} x {shown}", nominal.show())));
    }
    let length = part.quantity::<Length>(&circuit::LENGTH)?;
    let (capacitance, _) = part.quantity_reading(&circuit::CAPACITANCE_PER_LENGTH)?;
    let omega = 2.0 * std::f64::consts::PI * case.frequency()?.si();
    let power = omega * capacitance.measure.si? * length.value.si() * nominal.si().powi(2);
    Some((Power::from_si(power), format!("w x {} x {} x ({})2", capacitance.measure, length.measure, nominal.show())))
}

fn compensated(case: &Case<'_>, findings: &mut Findings) {
    let closing =
        case.breaker.word(&breaker::CONTROLLED_SWITCHING).is_some_and(|(word, _)| word.starts_with("closing"));
    let resistor = case.breaker.quantity::<ElectricalResistance>(&breaker::CLOSING_RESISTOR).is_some();
    for part in case.circuits_of(&["cable", "cable network", "overhead line with cable"]) {
        let apart = part.yes_no(&circuit::COMPENSATION_SWITCHED_WITH_THE_CIRCUIT).is_some_and(|(yes, _)| !yes);
        let measured = has_measure(case, part, &["controlled closing", "closing resistor", "staggered switching"]);
        if apart || closing || resistor || measured {
            continue;
        }
        let (Some(reactors), Some((charging, formula))) =
            (part.quantity::<Power>(&circuit::SHUNT_COMPENSATION), charging_power(case, part))
        else {
            continue;
        };
        let share = reactors.value.si() / charging.si();
        if share <= COMPENSATED * (1.0 + EQUAL) {
            continue;
        }
        let shown = crate::duty::percent(share);
        let mvar = format!("{} Mvar", significant(charging.si() / 1e6, 3));
        let message = format!(
            "{shown} of the charging power is compensated: when the circuit is closed in, the current may have no zero for many \
             cycles, and the breaker cannot open it"
        );
        findings
            .add(&COMPENSATED_CABLE, reactors.place(), message)
            .label("delayed current zero")
            .stated(&reactors.measure)
            .needed(format!("at most {} of {mvar}", crate::duty::percent(COMPENSATED)))
            .working(format!("{formula} = {mvar}; {} / {mvar} = {shown}", reactors.measure))
            .related(case.sheet.heading, "the breaker")
            .advice("ask for controlled switching: closing at the crest of the voltage, a closing resistor, or staggered switching");
    }
}

/// A closing resistor has its data.
pub static CLOSING_RESISTOR_INCOMPLETE: Rule = Rule {
    name: "closing-resistor-incomplete",
    title: "A closing resistor has its insertion time and duty, and does not stand beside controlled closing.",
    kind: FindingKind::Omission,
    basis: "IEC/TR 62271-306 (from memory)",
    formula: "ohm, ms and number of closings; closing resistor or controlled closing",
    explanation: "Without insertion time and closings in a row its heat cannot be designed. Resistor and controlled closing do the same \
                  for the overvoltage; both together are a caution. Silent where no resistor is asked for.",
    check: Check::Case(resistor),
};

fn resistor(case: &Case<'_>, findings: &mut Findings) {
    let Some(resistor) = case.breaker.quantity::<ElectricalResistance>(&breaker::CLOSING_RESISTOR) else { return };
    let missing: Vec<&str> = [&breaker::CLOSING_RESISTOR_INSERTION_TIME, &breaker::CLOSING_RESISTOR_DUTY]
        .into_iter()
        .filter(|particular| !case.breaker.mentions(particular))
        .map(|particular| particular.label)
        .collect();
    if !missing.is_empty() {
        let labels = missing.join(" and ");
        findings
            .add(
                &CLOSING_RESISTOR_INCOMPLETE,
                resistor.place(),
                format!("the closing resistor has no {}", missing.join(" and no ")),
            )
            .label("its heat cannot be designed")
            .stated(&resistor.measure)
            .advice(format!("add {labels} (8 to 12 ms, and two closings in a row, are usual)"));
    }
    if let Some((word, statement)) = case.breaker.word(&breaker::CONTROLLED_SWITCHING)
        && word.starts_with("closing")
    {
        let message = "a closing resistor and controlled closing do the same: one of them is paid for nothing";
        let finding = findings.add(&CLOSING_RESISTOR_INCOMPLETE, resistor.place(), message);
        finding.kind(FindingKind::Caution).label("twice the same").stated(&resistor.measure);
        finding.beside(statement, "controlled closing").advice("drop one of the two, or give the reason");
    }
}

/// Reclosing is for lines.
pub static RECLOSING_MISPLACED: Rule = Rule {
    name: "reclosing-misplaced",
    title: "No reclosing scheme stands at a reactor, a bank or a transformer.",
    kind: FindingKind::Caution,
    basis: "common practice, no source",
    formula: "auto-reclosing: none for shunt reactor, capacitor bank, filter bank and transformer",
    explanation: "Faults of these do not pass by themselves, and a bank must discharge before it is closed again. The scheme was \
                  probably copied from a line bay.",
    check: Check::Case(misplaced),
};

/// Things whose faults do not pass by themselves.
const NOT_RECLOSED: [&str; 4] = ["shunt reactor", "capacitor bank", "filter bank", "transformer"];

fn misplaced(case: &Case<'_>, findings: &mut Findings) {
    for part in case.circuits_of(&NOT_RECLOSED) {
        let Some((kind, kind_statement)) = kind_of(part) else { continue };
        let scheme = match part.word(&circuit::AUTO_RECLOSING) {
            Some(("none", _)) => continue,
            Some((_, statement)) => Some(statement),
            None => None,
        };
        let dead = [&circuit::AUTO_RECLOSING_DEAD_TIME, &circuit::SINGLE_PHASE_DEAD_TIME];
        let Some(statement) = scheme.or_else(|| dead.into_iter().find_map(|p| part.statement(p))) else { continue };
        let finding = findings.add(
            &RECLOSING_MISPLACED,
            statement.value,
            format!("a {kind} is not reclosed: copied from a line bay?"),
        );
        finding.label("not for reclosing").beside(kind_statement, "what is switched").needed("none");
        if scheme.is_some() {
            finding.replace_by("none");
        } else {
            finding.advice("delete the dead time");
        }
    }
}

/// What is switched many times a day needs more than a class.
pub static OPERATIONS_ENDURANCE: Rule = Rule {
    name: "operations-endurance",
    title: "A breaker of a furnace, a traction supply or a pumped storage plant has an endurance of its own.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-100:2021 classes M1, M2 (from memory)",
    formula: "operations a day x 365 x years <= 10 000",
    explanation: "Above 10 000 operations no class has a test. Where it is not said how often the breaker is switched, that is asked \
                  for. Other circuits are looked at by mechanical-class.",
    check: Check::Case(endurance),
};

fn endurance(case: &Case<'_>, findings: &mut Findings) {
    let Some((kind, statement)) = case.circuits_of(&FREQUENT).next().and_then(kind_of) else { return };
    let Some(operations) = case.duty.switching.operations.as_ref() else {
        if case.circuits.iter().any(|part| part.mentions(&circuit::OPERATIONS_PER_DAY)) {
            return;
        }
        let message = format!("a breaker of a {kind} is switched often, and how often is not stated");
        findings
            .add(&OPERATIONS_ENDURANCE, statement.value, message)
            .kind(FindingKind::Omission)
            .label("how often a day?")
            .related(case.sheet.heading, "the breaker")
            .advice("add operations per day to the circuit");
        return;
    };
    if crate::standards::class_for_operations(operations.value.si()).is_some() {
        return;
    }
    let message = format!(
        "{} operations over the life are more than any class is tested for: a special endurance has to be agreed",
        hundreds(operations.value.si())
    );
    findings
        .add(&OPERATIONS_ENDURANCE, operations.places().next().unwrap_or(statement.value), message)
        .label("beyond class M2")
        .working(operations.working.to_string())
        .beside(statement, "what is switched")
        .related(case.sheet.heading, "the breaker")
        .advice("state the number of operations before maintenance, and ask for the test; vacuum or a contactor may do better");
}

/// The restrike class suits the duty.
pub static RESTRIKE_CLASS: Rule = Rule {
    name: "restrike-class",
    title: "Banks, and cables and lines that are switched daily, have a breaker of class C2.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-100:2021 classes C1, C2 (from memory)",
    formula: "C2 for banks, and from one operation a day for cables and lines",
    explanation: "Class C1 has a low, C2 a very low probability of restrikes in the test, and each operation is a chance. A bank that is \
                  switched less than daily may have C1. Where no class is stated, it is asked for on banks only.",
    check: Check::Case(restrike),
};

/// From here on an object is switched daily, operations a day.
const DAILY: f64 = 1.0;

fn restrike(case: &Case<'_>, findings: &mut Findings) {
    let class = case.breaker.class(&breaker::CLASSES, 'C');
    if class.is_some_and(|(class, _)| class.grade >= 2)
        || (case.breaker.mentions(&breaker::CLASSES) && case.breaker.classes(&breaker::CLASSES).is_none())
    {
        return;
    }
    let wants = case.circuits.iter().find_map(|part| {
        let (kind, statement) = kind_of(part)?;
        let daily = part
            .quantity_reading(&circuit::OPERATIONS_PER_DAY)
            .and_then(|(reading, _)| reading.upper().si)
            .map(|rate| rate * 86_400.0 >= DAILY * (1.0 - EQUAL));
        let wants = match kind {
            "capacitor bank" | "filter bank" => daily.unwrap_or(true),
            "cable" | "cable network" | "overhead line" | "overhead line with cable" => {
                daily.unwrap_or(false) && class.is_some()
            }
            _ => false,
        };
        wants.then_some((kind, statement, daily.is_some()))
    });
    let Some((kind, statement, known)) = wants else { return };
    let often = if known { " that is switched daily" } else { "" };
    let stated = class.map_or_else(|| "no class C".to_owned(), |(class, _)| class.to_string());
    let message = format!("a {kind}{often} wants class C2; {stated} is asked for");
    let list = case.breaker.statement(&breaker::CLASSES);
    let place = class.map_or_else(|| list.map_or(case.sheet.heading, |list| list.value), |(class, _)| class.place);
    let finding = findings.add(&RESTRIKE_CLASS, place, message);
    finding.label("not the class for it").stated(stated).needed("C2").beside(statement, "what is switched");
    match (class, list) {
        (Some((class, _)), _) => {
            finding.edit("write C2", class.place, "C2");
        }
        (None, Some(list)) => {
            finding.edit("add C2", after(list.value), ", C2");
        }
        (None, None) => add_line(finding, case.sheet, &breaker::CLASSES, "C2"),
    }
}

/// A rating has its object.
pub static CAPACITIVE_RATING_NEEDLESS: Rule = Rule {
    name: "capacitive-rating-needless",
    title: "A capacitive or inductive switching rating is asked for where there is something to switch.",
    kind: FindingKind::Excess,
    basis: "IEC 62271-100:2021 (from memory); cost",
    formula: "line-charging: line; cable-charging: cable; bank and inrush: bank; reactor: reactor; motor: motor",
    explanation: "Each such rating is a series of tests. Silent where no circuit is described, on couplers, sections and spares, which \
                  take the place of another bay, on cable ratings where cables leave the busbar, and where copied-bay speaks.",
    check: Check::Case(needless),
};

/// Breakers that take the place of others.
const STAND_IN: [&str; 3] = ["bus coupler", "bus section", "spare"];

/// The ratings and the circuits that ask for them.
static OBJECTS: &[(&Particular, &str, &[&str])] = &[
    (&breaker::RATED_LINE_CHARGING_BREAKING_CURRENT, "line", &["overhead line", "overhead line with cable"]),
    (&breaker::RATED_CABLE_CHARGING_BREAKING_CURRENT, "cable", &["cable", "cable network", "overhead line with cable"]),
    (&breaker::RATED_CAPACITOR_BANK_BREAKING_CURRENT, "bank", &["capacitor bank", "filter bank"]),
    (&breaker::RATED_BACK_TO_BACK_CAPACITOR_BANK_BREAKING_CURRENT, "bank", &["capacitor bank", "filter bank"]),
    (&breaker::RATED_CAPACITOR_BANK_INRUSH_MAKING_CURRENT, "bank", &["capacitor bank", "filter bank"]),
    (&breaker::SHUNT_REACTOR_BREAKING_CURRENT, "reactor", &["shunt reactor"]),
    (&breaker::MOTOR_BREAKING_CURRENT, "motor", &["motor"]),
];

fn needless(case: &Case<'_>, findings: &mut Findings) {
    let kinds: Vec<&str> = case.circuits.iter().filter_map(|part| kind_of(part).map(|(kind, _)| kind)).collect();
    let unknown = kinds.is_empty() || kinds.len() < case.circuits.len();
    if unknown || kinds.iter().any(|kind| STAND_IN.contains(kind)) || !copied_lines(case).is_empty() {
        return;
    }
    let cables = case.system.word(&system::CONNECTION).is_some_and(|(word, _)| word.contains("cables"))
        || case.circuits.iter().any(|part| part.word(&circuit::CONNECTION_BY).is_some_and(|(by, _)| by == "cable"));
    for (particular, object, wanted) in OBJECTS {
        let Some(stated) = case.breaker.quantity::<ElectricCurrent>(particular) else { continue };
        if kinds.iter().any(|kind| wanted.contains(kind)) || (*object == "cable" && cables) {
            continue;
        }
        let message = format!("{} of {} is asked for, and no {object} is switched", particular.label, stated.measure);
        let finding = findings.add(&CAPACITIVE_RATING_NEEDLESS, stated.place(), message);
        finding.label(format!("no {object} to switch")).stated(&stated.measure);
        for (_, statement) in case.circuits.iter().filter_map(kind_of) {
            finding.beside(statement, "what is switched");
        }
        finding.advice("delete the line, or give the reason for it");
    }
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    fn switching(kind: &str) -> Bay {
        Bay::new()
            .set("circuit", "kind", kind)
            .set("circuit", "auto-reclosing", "none")
            .without("circuit", "auto-reclosing dead time")
    }

    #[test]
    fn reactors_have_their_standard() {
        let bay =
            switching("shunt reactor").set("circuit", "bank power", "50 Mvar").set("circuit", "bank voltage", "220 kV");
        let finding = bay.one("shunt-reactor-standard");
        assert_eq!(finding.kind, FindingKind::Omission);
        assert!(finding.working[0].ends_with("131 A"), "{:?}", finding.working);
        assert_eq!(finding.edits[0].text, ", IEC 62271-110");
        let cited = bay.set("tender", "standards", "IEC 62271-100:2021, IEC 62271-110:2017");
        assert!(cited.one("shunt-reactor-standard").message.contains("measure"));
        cited.set("breaker", "overvoltage mitigation", "surge arresters").silent("shunt-reactor-standard");
        Bay::new().silent("shunt-reactor-standard");
    }

    #[test]
    fn filters_are_tuned() {
        switching("filter bank").one("filter-bank");
        switching("filter bank").set("circuit", "tuning frequency", "245 Hz").silent("filter-bank");
        switching("capacitor bank").silent("filter-bank");
    }

    #[test]
    fn transformers_in_weak_networks() {
        // 132 kV and 28.4 kA are 6493 MVA.
        let bay = |power: &str| switching("transformer").set("circuit", "rated power", power);
        assert_eq!(bay("400 MVA").one("transformer-energising").kind, FindingKind::Remark);
        bay("324 MVA").silent("transformer-energising");
        bay("326 MVA").one("transformer-energising");
        bay("400 MVA").set("circuit", "residual flux control", "yes").silent("transformer-energising");
        switching("transformer").silent("transformer-energising");
    }

    #[test]
    fn motors_have_their_current() {
        let bay = switching("motor").set("circuit", "starting current", "900 A");
        assert_eq!(bay.one("motor-switching").edits[0].text, "\n    motor breaking current: 900 A");
        let stated = bay.set("breaker", "motor breaking current", "900 A");
        stated.silent("motor-switching");
        Bay::new().silent("motor-switching");
        assert!(switching("motor").one("motor-switching").edits.is_empty());
    }

    #[test]
    fn compensated_cables() {
        // 314.16 x 0.2 uF/km x 40 km x (132 kV)2 = 43.8 Mvar.
        let bay = |mvar: &str| {
            switching("cable")
                .set("circuit", "length", "40 km")
                .set("circuit", "capacitance per length", "0.2 uF/km")
                .set("circuit", "shunt compensation", mvar)
        };
        let finding = bay("30 Mvar").one("compensated-cable");
        assert!(finding.message.contains("68.5 %"), "{}", finding.message);
        bay("21.8 Mvar").silent("compensated-cable");
        bay("22 Mvar").one("compensated-cable");
        bay("30 Mvar").set("circuit", "compensation switched with the circuit", "no").silent("compensated-cable");
        bay("30 Mvar").set("breaker", "controlled switching", "closing").silent("compensated-cable");
        bay("30 Mvar").set("breaker", "overvoltage mitigation", "staggered switching").silent("compensated-cable");
        // Of a mixed circuit both parts count: 132 kV and 100 A are 22.9 Mvar, 200 A 45.7 Mvar.
        let mixed = switching("overhead line with cable").set("circuit", "charging current", "100 A").set(
            "circuit",
            "shunt compensation",
            "20 Mvar",
        );
        mixed.one("compensated-cable");
        mixed.set("circuit", "cable section charging current", "100 A").silent("compensated-cable");
    }

    #[test]
    fn closing_resistors_have_their_data() {
        let bay = Bay::new().set("breaker", "closing resistor", "400 ohm");
        assert!(bay.one("closing-resistor-incomplete").message.contains("duty"));
        let whole = bay.set("breaker", "closing resistor insertion time", "8 to 12 ms").set(
            "breaker",
            "closing resistor duty",
            "\"two closings, then 15 min\"",
        );
        whole.silent("closing-resistor-incomplete");
        let twice = whole.set("breaker", "controlled switching", "closing").one("closing-resistor-incomplete");
        assert_eq!(twice.kind, FindingKind::Caution);
        Bay::new().silent("closing-resistor-incomplete");
    }

    #[test]
    fn reclosing_at_the_wrong_place() {
        for kind in ["shunt reactor", "capacitor bank", "transformer"] {
            assert_eq!(Bay::new().set("circuit", "kind", kind).one("reclosing-misplaced").edits[0].text, "none");
            switching(kind).silent("reclosing-misplaced");
        }
        let dead = Bay::new().set("circuit", "kind", "transformer").without("circuit", "auto-reclosing");
        assert!(dead.one("reclosing-misplaced").edits.is_empty());
        Bay::new().silent("reclosing-misplaced");
    }

    #[test]
    fn what_is_switched_many_times_a_day() {
        let bay = |a_day: &str| switching("arc furnace").set("circuit", "operations per day", a_day);
        let finding = bay("30 per day").one("operations-endurance");
        assert!(finding.message.contains("328500"), "{}", finding.message);
        bay("30 per day").silent("mechanical-class");
        bay("0.9 per day").silent("operations-endurance");
        bay("0.92 per day").one("operations-endurance");
        assert_eq!(switching("traction").one("operations-endurance").kind, FindingKind::Omission);
        Bay::new().silent("operations-endurance");
    }

    #[test]
    fn restrikes() {
        let bay = |kind: &str, class: &str| switching(kind).set("breaker", "classes", class);
        assert_eq!(bay("capacitor bank", "C1, M2").one("restrike-class").edits[0].text, "C2");
        assert_eq!(bay("capacitor bank", "M2").one("restrike-class").edits[0].text, ", C2");
        bay("capacitor bank", "C1, M2").set("circuit", "operations per day", "0.1 per day").silent("restrike-class");
        bay("cable", "C1, M2").silent("restrike-class");
        bay("cable", "C1, M2").set("circuit", "operations per day", "1 per day").one("restrike-class");
        bay("cable", "M2").silent("restrike-class");
        bay("capacitor bank", "C2, M2").silent("restrike-class");
    }

    #[test]
    fn ratings_without_their_object() {
        let bay = |label: &str| Bay::new().set("breaker", label, "400 A");
        assert_eq!(
            bay("rated capacitor bank breaking current").one("capacitive-rating-needless").kind,
            FindingKind::Excess
        );
        let cable = bay("rated cable-charging breaking current");
        cable.one("capacitive-rating-needless");
        cable.clone().set("system", "connection", "overhead lines and cables").silent("capacitive-rating-needless");
        cable.set("circuit", "kind", "bus coupler").silent("capacitive-rating-needless");
        Bay::new().silent("capacitive-rating-needless");
        bay("rated capacitor bank breaking current")
            .set("breaker", "reason for rated capacitor bank breaking current", "\"a bank will come\"")
            .silent("capacitive-rating-needless");
    }
}
