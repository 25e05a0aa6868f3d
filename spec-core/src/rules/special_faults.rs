//! Rules on faults beside the terminal fault: on lines, behind reactors and transformers, out of phase.

use super::network_trv::is_studied;
use super::several_breakers::copied_lines;
use super::switching_special::kind_of;
use super::{Check, EQUAL, Rule, add_line, breaking_current};
use crate::case::{Case, Part};
use crate::duty::limited;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{breaker, circuit, system};
use crate::quantity::{
    Capacitance, ElectricCurrent, ElectricPotential, ElectricalResistance, Frequency, Length, Physical, Power, Ratio,
    Time, significant,
};
use crate::sheet::Statement;
use crate::standards::{Duty, out_of_phase_factor};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &SHORT_LINE_FAULT_MISSING,
    &SHORT_LINE_FAULT_NEEDLESS,
    &INITIAL_TRV,
    &OUT_OF_PHASE_MISSING,
    &SERIES_REACTOR_TRV,
    &SERIES_COMPENSATION,
    &TRANSFORMER_LIMITED_FAULT,
];

/// A line bay has its short-line fault.
pub static SHORT_LINE_FAULT_MISSING: Rule = Rule {
    name: "short-line-fault-missing",
    title: "A breaker connected to an overhead line has the short-line fault rating.",
    kind: FindingKind::Omission,
    basis: "IEC 62271-100:2008 4.105 (from memory)",
    formula: "direct connection to an overhead line, Ur >= 15 kV, Isc > 12.5 kA: L90 and L75",
    explanation: "A fault some kilometre away gives a steeper recovery voltage than one at the terminals. Silent where cable lies \
                  between breaker and line, below 100 kV for a breaker of class S1, and where the rating is open or left to the \
                  duty. Stated as not required, it is told as well.",
    check: Check::Case(short_line),
};

/// The rating is one of breakers from here (IEC 62271-100:2008 4.105, from memory).
const SHORT_LINE_VOLTAGE: f64 = 15e3;
const SHORT_LINE_CURRENT: f64 = 12.5e3;

/// Below, the class S1 or S2 says whether lines are connected (IEC 62271-100, from memory).
const CLASSES_BELOW: f64 = 100e3;

fn short_line(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(isc)) = (case.rated_voltage(), breaking_current(case)) else { return };
    let Some((_, line)) = case.circuits_of(&["overhead line"]).next().and_then(kind_of) else { return };
    let applies =
        rated.value.si() >= SHORT_LINE_VOLTAGE * (1.0 - EQUAL) && isc.value.si() > SHORT_LINE_CURRENT * (1.0 + EQUAL);
    let cables = rated.value.si() < CLASSES_BELOW
        && case.breaker.class(&breaker::CLASSES, 'S').is_some_and(|(class, _)| class.grade == 1);
    if !applies || cables || case.breaker.mentions(&breaker::SHORT_LINE_FAULT_DUTIES) {
        return;
    }
    let denied = match case.breaker.yes_no(&breaker::SHORT_LINE_FAULT) {
        Some((false, statement)) => Some(statement),
        None if !case.breaker.mentions(&breaker::SHORT_LINE_FAULT) => None,
        _ => return,
    };
    let message = format!(
        "a line bay for {} and {} {}",
        rated.measure,
        isc.measure,
        if denied.is_some() { "does without the short-line fault" } else { "states no short-line fault rating" }
    );
    let place = denied.map_or(line.value, |statement| statement.value);
    let finding = findings.add(&SHORT_LINE_FAULT_MISSING, place, message);
    finding.label("no short-line fault").needed("required: L90, L75");
    finding.related(case.sheet.heading, "the breaker").beside(isc.statement, "the breaking current");
    match denied {
        Some(_) => {
            finding.beside(line, "an overhead line").replace_by("required");
        }
        None => add_line(finding, case.sheet, &breaker::SHORT_LINE_FAULT, "required"),
    }
}

/// No short-line fault without a line.
pub static SHORT_LINE_FAULT_NEEDLESS: Rule = Rule {
    name: "short-line-fault-needless",
    title: "The short-line fault rating is asked for where a line is connected.",
    kind: FindingKind::Excess,
    basis: "IEC 62271-100:2008 4.105 (from memory); cost",
    formula: "only cables, reactors or banks switched: not required",
    explanation: "The rating is a series of tests of its own. Silent where anything else is switched too, and where copied-bay speaks.",
    check: Check::Case(short_line_needless),
};

/// Bays behind which no line can have a fault.
const NO_LINE: [&str; 5] = ["cable", "cable network", "shunt reactor", "capacitor bank", "filter bank"];

fn short_line_needless(case: &Case<'_>, findings: &mut Findings) {
    let Some((true, statement)) = case.breaker.yes_no(&breaker::SHORT_LINE_FAULT) else { return };
    let none = !case.circuits.is_empty()
        && case.circuits.iter().all(|part| kind_of(part).is_some_and(|(kind, _)| NO_LINE.contains(&kind)));
    if !none || !copied_lines(case).is_empty() {
        return;
    }
    let finding = findings.add(
        &SHORT_LINE_FAULT_NEEDLESS,
        statement.value,
        "the short-line fault is asked for, and no overhead line is connected",
    );
    finding.label("no line").stated("required").needed("not required");
    for (_, kind) in case.circuits.iter().filter_map(kind_of) {
        finding.beside(kind, "what is switched");
    }
    finding.replace_by("not required");
}

/// The initial TRV is for open-air busbars.
pub static INITIAL_TRV: Rule = Rule {
    name: "initial-trv",
    title: "The initial TRV is asked for where a busbar in air can cause it.",
    kind: FindingKind::Remark,
    basis: "IEC 62271-100 (from memory); public tutorial on TRV",
    formula: "Ur >= 100 kV, Isc >= 25 kA, not gas-insulated",
    explanation: "The initial TRV comes from the first reflection on the busbar. Gas-insulated substations have none that counts, and \
                  low voltages and currents neither. A breaker with a short-line fault rating and no delay of the line covers it.",
    check: Check::Case(initial),
};

/// The initial TRV counts from here (IEC 62271-100, from memory).
const INITIAL_VOLTAGE: f64 = 100e3;
const INITIAL_CURRENT: f64 = 25e3;

fn initial(case: &Case<'_>, findings: &mut Findings) {
    let Some((true, statement)) = case.breaker.yes_no(&breaker::INITIAL_TRV) else { return };
    let enclosed = case
        .breaker
        .words(&breaker::CONSTRUCTION)
        .filter(|(words, _)| !words.is_empty() && words.iter().all(|word| *word == "gas-insulated"));
    let low = case.rated_voltage().filter(|ur| ur.value.si() < INITIAL_VOLTAGE * (1.0 - EQUAL));
    let weak = breaking_current(case).filter(|isc| isc.value.si() < INITIAL_CURRENT * (1.0 - EQUAL));
    let (why, beside) = match (enclosed, low, weak) {
        (Some((_, built)), ..) => ("in gas-insulated switchgear".to_owned(), built),
        (None, Some(ur), _) => (format!("at {}", ur.measure), ur.statement),
        (None, None, Some(isc)) => (format!("with {}", isc.measure), isc.statement),
        _ => return,
    };
    findings
        .add(&INITIAL_TRV, statement.value, format!("the initial TRV is without effect {why}"))
        .label("without effect here")
        .stated("required")
        .needed("not required")
        .beside(beside, "why")
        .replace_by("not required");
}

/// Where two live systems meet, out of phase is rated.
pub static OUT_OF_PHASE_MISSING: Rule = Rule {
    name: "out-of-phase-missing",
    title: "A breaker between two live systems has an out-of-phase rating.",
    kind: FindingKind::Omission,
    basis: "IEC 62271-100:2021 5.105 (from memory)",
    formula: "source at far end or synchronising: Id = 25 % Isc, uc = kpp kaf Ur sqrt(2/3)",
    explanation: "Systems that fall out of step put up to twice the voltage across the breaker. Silent where no circuit has a source at \
                  its far end or synchronises, and where the current is stated, open or left to the duty.",
    check: Check::Case(out_of_phase),
};

/// Share of the breaking current (IEC 62271-100 5.105; public digest of IEC 56:1987).
const OUT_OF_PHASE_SHARE: f64 = 0.25;

fn out_of_phase(case: &Case<'_>, findings: &mut Findings) {
    if case.breaker.mentions(&breaker::RATED_OUT_OF_PHASE_BREAKING_CURRENT) {
        return;
    }
    let live = case.circuits.iter().find_map(|part| {
        [&circuit::SYNCHRONISING, &circuit::SOURCE_AT_FAR_END]
            .into_iter()
            .find_map(|particular| part.yes_no(particular).and_then(|(yes, statement)| yes.then_some(statement)))
    });
    let Some(live) = live else { return };
    let isc = breaking_current(case);
    let shown = isc.as_ref().map(|isc| isc.like(isc.value * OUT_OF_PHASE_SHARE));
    let message =
        format!("two live systems can meet across {}, and no out-of-phase rating is stated", case.sheet.title());
    let finding = findings.add(&OUT_OF_PHASE_MISSING, live.value, message);
    finding.label("systems may fall out of step").related(case.sheet.heading, "the breaker");
    if let (Some(isc), Some(shown)) = (isc, shown) {
        finding.needed(shown.as_str()).working(format!("25 % x {} = {shown}", isc.measure));
        add_line(finding, case.sheet, &breaker::RATED_OUT_OF_PHASE_BREAKING_CURRENT, &shown);
    }
    if let Some((_, working)) = case.duty.trv.envelope(Duty::OutOfPhase) {
        finding.working(working.as_str());
    }
    let earthed = case.duty.effectively_earthed.map(|(earthed, _)| earthed);
    if let Some(factor) = earthed.and_then(out_of_phase_factor) {
        finding.advice(format!("with an out-of-phase voltage factor of {factor:.1}, by the earthing of the neutral"));
    }
}

/// The oscillation of a series reactor is tamed.
pub static SERIES_REACTOR_TRV: Rule = Rule {
    name: "series-reactor-trv",
    title: "A series reactor beside the breaker has a capacitance that slows its oscillation.",
    kind: FindingKind::Caution,
    basis: "IEEE C37.011 (from memory); public literature on current-limiting reactors (2007)",
    formula: "1/(2 f) of the reactor with its capacitance, or by its own frequency, >= time to peak of the envelope at that current",
    explanation: "With its stray capacitance a reactor oscillates at tens of kilohertz, far faster than any terminal fault duty. Silent \
                  where a capacitor to earth or across the reactor, or the class for fast transients, is asked for, and where the \
                  stated capacitance is enough or the stated natural frequency low enough.",
    check: Check::Case(series_reactor),
};

fn reactor_measure(case: &Case<'_>) -> bool {
    let wanted = ["capacitor to earth", "capacitor across reactor", "RC snubber"];
    let words = case
        .breaker
        .words(&breaker::TRV_MITIGATION)
        .is_some_and(|(words, _)| words.iter().any(|word| wanted.contains(word)));
    words || case.breaker.yes_no(&breaker::FAST_TRV_CLASS).is_some_and(|(yes, _)| yes)
}

/// The duty whose share of the breaking current covers this one.
fn duty_of(share: f64) -> Duty {
    if share <= 0.1 {
        Duty::T10
    } else if share <= 0.3 {
        Duty::T30
    } else if share <= 0.6 {
        Duty::T60
    } else {
        Duty::T100
    }
}

fn series_reactor(case: &Case<'_>, findings: &mut Findings) {
    if reactor_measure(case) {
        return;
    }
    for part in case.circuits.iter().filter(|part| !is_studied(part)) {
        let Some(reactor) = part.quantity::<ElectricalResistance>(&circuit::SERIES_REACTOR) else { continue };
        let working = match oscillation(case, part, reactor.value) {
            Ok(slow) if slow.is_empty() => continue,
            Ok(fast) => Some(fast),
            Err(()) => None,
        };
        let said = [&circuit::SERIES_REACTOR_CAPACITANCE, &circuit::NATURAL_FREQUENCY];
        if working.is_none() && said.into_iter().any(|particular| part.mentions(particular)) {
            continue;
        }
        let message = format!(
            "the series reactor of {} oscillates {} than the breaker is tested for",
            reactor.measure,
            if working.is_some() { "faster" } else { "with its stray capacitance alone, far faster" }
        );
        let finding = findings.add(&SERIES_REACTOR_TRV, reactor.place(), message);
        finding.label("a fast recovery voltage").stated(&reactor.measure).related(case.sheet.heading, "the breaker");
        if let Some(working) = working {
            finding.working(working);
        }
        finding.advice(
            "add TRV mitigation: capacitor across reactor, or capacitor to earth; or ask for the class for fast transients",
        );
    }
}

/// The working where the oscillation is too fast, nothing where it is slow enough; an error where it cannot be reckoned.
fn oscillation(case: &Case<'_>, part: &Part<'_>, reactance: ElectricalResistance) -> Result<String, ()> {
    let capacitance = part.quantity::<Capacitance>(&circuit::SERIES_REACTOR_CAPACITANCE);
    let natural = part.quantity::<Frequency>(&circuit::NATURAL_FREQUENCY).filter(|stated| stated.value.si() > 0.0);
    if capacitance.is_none() && natural.is_none() {
        return Err(());
    }
    let omega = 2.0 * std::f64::consts::PI * case.frequency().ok_or(())?.si();
    let isc = breaking_current(case).ok_or(())?;
    let nominal = case.system.quantity::<ElectricPotential>(&system::NOMINAL_VOLTAGE).ok_or(())?;
    let network = case.duty.short_circuit_current.as_ref().ok_or(())?;
    let phase = nominal.value.si() / 3f64.sqrt();
    let current = phase / (phase / network.value.si() + reactance.si());
    let duty = duty_of(current / isc.value.si());
    let (envelope, _) = case.duty.trv.envelope(duty).ok_or(())?;
    let needed = envelope.t3.or(envelope.t2).unwrap_or(envelope.uc / envelope.rate);
    // A stated capacitance counts before the reactor's own frequency, of which it may be the cure.
    let of_capacitance = capacitance.map(|stated| {
        let time = std::f64::consts::PI * (reactance.si() / omega * stated.value.si()).sqrt();
        (time, format!("pi sqrt(L C) with {}", stated.measure))
    });
    let of_frequency = || natural.map(|stated| (0.5 / stated.value.si(), format!("1/(2 f) of {}", stated.measure)));
    let (time, how) = of_capacitance.or_else(of_frequency).ok_or(())?;
    if time >= needed.si() {
        return Ok(String::new());
    }
    let us = |time: f64| format!("{} us", significant(time * 1e6, 3));
    Ok(format!(
        "{how} = {} ({} kHz) < {} of {} for {} kA",
        us(time),
        significant(0.5e-3 / time, 3),
        us(Time::si(needed)),
        duty.word(),
        significant(current / 1e3, 3)
    ))
}

/// Series capacitors raise the TRV.
pub static SERIES_COMPENSATION: Rule = Rule {
    name: "series-compensation",
    title: "On a series-compensated line the TRV and the by-passing of the capacitor are said.",
    kind: FindingKind::Caution,
    basis: "IEC/TR 62271-306, IEEE C37.011 (from memory)",
    formula: "series compensation > 0: prospective TRV stated, or a measure against it",
    explanation: "The charge left on the series capacitor adds to the recovery voltage, beyond the standard envelopes, unless it is \
                  by-passed before the breaker opens. Silent where a prospective TRV or TRV mitigation is stated.",
    check: Check::Case(compensation),
};

fn compensation(case: &Case<'_>, findings: &mut Findings) {
    let told = case.system.mentions(&system::PROSPECTIVE_TRV_PEAK) || case.breaker.mentions(&breaker::TRV_MITIGATION);
    for part in &case.circuits {
        let Some(share) = part.quantity::<Ratio>(&circuit::SERIES_COMPENSATION) else { continue };
        if told || is_studied(part) || share.value.si() <= 0.0 {
            continue;
        }
        let message = format!(
            "{} of the line is series-compensated, which raises the recovery voltage beyond the standard",
            share.measure
        );
        findings
            .add(&SERIES_COMPENSATION, share.place(), message)
            .label("a higher recovery voltage")
            .stated(&share.measure)
            .related(case.sheet.heading, "the breaker")
            .advice(
                "state the prospective TRV of a study, and whether the capacitor is by-passed before the breaker opens",
            );
    }
}

/// A fault fed by a transformer has a fast TRV.
pub static TRANSFORMER_LIMITED_FAULT: Rule = Rule {
    name: "transformer-limited-fault",
    title: "Where the connection to a transformer is short, the fault that it limits is rated.",
    kind: FindingKind::Caution,
    basis: "IEEE C37.011, IEC 62271-100:2008 annex M (from memory)",
    formula: "I = Sr/(sqrt3 U uk), 7 to 60 % of Isc, connection by bars of at most 50 m",
    explanation: "A transformer with little capacitance beside it swings faster than T10 and T30. Where its natural frequency or its \
                  capacitance to earth is stated, its rate of rise is held against the envelope at that current. Silent where that \
                  covers it; where the connection is long, of cable or gas-insulated duct, or its length is not stated; where the \
                  current lies outside of 7 to 60 %; and where the rating, or the class for fast transients, is answered.",
    check: Check::Case(limited_fault),
};

/// Bounds of the fault current as shares of Isc (IEEE C37.011, from memory), and a short connection, m (common practice, no source).
const LIMITED_FROM: f64 = 0.07;
const LIMITED_TO: f64 = 0.60;
const SHORT_CONNECTION: f64 = 50.0;

fn limited_fault(case: &Case<'_>, findings: &mut Findings) {
    let answered = [
        &breaker::TRANSFORMER_LIMITED_FAULT,
        &breaker::TRANSFORMER_LIMITED_FAULT_BREAKING_CURRENT,
        &breaker::FAST_TRV_CLASS,
    ];
    let (Some(isc), Some(nominal)) =
        (breaking_current(case), case.system.quantity::<ElectricPotential>(&system::NOMINAL_VOLTAGE))
    else {
        return;
    };
    if answered.into_iter().any(|particular| case.breaker.mentions(particular)) {
        return;
    }
    for part in case.circuits_of(&["transformer"]).filter(|part| !is_studied(part)) {
        let (Some(power), Some(impedance), Some(length)) = (
            part.quantity::<Power>(&circuit::RATED_POWER),
            part.quantity::<Ratio>(&circuit::IMPEDANCE_VOLTAGE),
            part.quantity::<Length>(&circuit::CONNECTION_LENGTH),
        ) else {
            continue;
        };
        let bars = part.word(&circuit::CONNECTION_BY).is_none_or(|(by, _): (&str, &Statement)| by == "bars");
        if !bars || length.value.si() > SHORT_CONNECTION * (1.0 + EQUAL) || impedance.value.si() <= 0.0 {
            continue;
        }
        let current: ElectricCurrent = power.value / (3f64.sqrt() * nominal.value) / impedance.value.si();
        let share = current.si() / isc.value.si();
        if !(LIMITED_FROM..=LIMITED_TO).contains(&share) {
            continue;
        }
        // Where the transformer's own oscillation is known, it is held against the envelope at that current.
        let reactance = nominal.value / (3f64.sqrt() * current);
        let (natural, capacitance) = (
            part.quantity::<Frequency>(&circuit::NATURAL_FREQUENCY),
            part.quantity::<Capacitance>(&circuit::CAPACITANCE_TO_EARTH),
        );
        let known = limited(case, current, reactance, natural.map(|s| s.value), capacitance.map(|s| s.value));
        if known.as_ref().is_some_and(|(covered, _)| *covered) {
            continue;
        }
        let shown = isc.like(current);
        let percent = crate::duty::percent(share);
        let message = format!(
            "a fault fed by the transformer is {shown}, {percent} of the breaking current, over a connection of {}: its recovery \
             voltage is faster than the standard duties",
            length.measure
        );
        findings
            .add(&TRANSFORMER_LIMITED_FAULT, power.place(), message)
            .label("a fast recovery voltage")
            .needed(Datum { text: shown.clone(), si: Some(current.si()) })
            .working(format!("{} / (sqrt3 x {} x {}) = {shown}", power.measure, nominal.measure, impedance.measure))
            .working(known.map(|(_, working)| working).unwrap_or_default())
            .beside(length.statement, "a short connection")
            .beside(isc.statement, "the breaking current")
            .advice("add transformer-limited fault: yes with its current, or ask for the class for fast transients");
    }
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const ISC: &str = "rated short-circuit breaking current";

    #[test]
    fn line_bays_have_the_short_line_fault() {
        let bay = Bay::new().without("breaker", "short-line fault");
        let finding = bay.one("short-line-fault-missing");
        assert_eq!(finding.kind, FindingKind::Omission);
        assert_eq!(finding.edits[0].text, "\n    short-line fault: required");
        let denied = Bay::new().set("breaker", "short-line fault", "not required");
        assert_eq!(denied.one("short-line-fault-missing").edits[0].text, "required");
        bay.clone().set("breaker", ISC, "12.5 kA").silent("short-line-fault-missing");
        bay.clone().set("circuit", "kind", "overhead line with cable").silent("short-line-fault-missing");
        let low = bay.set("breaker", "rated voltage", "36 kV");
        low.one("short-line-fault-missing");
        low.set("breaker", "classes", "C2, M2, S1").silent("short-line-fault-missing");
        Bay::new().silent("short-line-fault-missing");
    }

    #[test]
    fn no_short_line_fault_without_a_line() {
        let cable = Bay::new().set("circuit", "kind", "cable");
        assert_eq!(cable.one("short-line-fault-needless").edits[0].text, "not required");
        cable.set("breaker", "short-line fault", "no").silent("short-line-fault-needless");
        // A reactor bay with more of a line is told by copied-bay.
        Bay::new().set("circuit", "kind", "shunt reactor").silent("short-line-fault-needless");
        Bay::new().set("circuit", "kind", "overhead line with cable").silent("short-line-fault-needless");
        Bay::new().silent("short-line-fault-needless");
    }

    #[test]
    fn initial_trv_without_effect() {
        let bay = || Bay::new().set("breaker", "initial TRV", "required");
        bay().silent("initial-trv");
        bay().set("breaker", "construction", "gas-insulated").one("initial-trv");
        bay().set("breaker", ISC, "20 kA").one("initial-trv");
        bay().set("breaker", ISC, "25 kA").silent("initial-trv");
        bay().set("breaker", "rated voltage", "72.5 kV").one("initial-trv");
        Bay::new().set("breaker", "construction", "gas-insulated").silent("initial-trv");
    }

    #[test]
    fn two_live_systems() {
        let bay = Bay::new().without("breaker", "rated out-of-phase breaking current");
        let finding = bay.one("out-of-phase-missing");
        assert_eq!(finding.needed.expect("a current").text, "7.88 kA");
        assert!(finding.working[1].contains("296 kV"), "{:?}", finding.working);
        bay.clone().set("circuit", "source at far end", "no").silent("out-of-phase-missing");
        bay.clone()
            .without("circuit", "source at far end")
            .set("circuit", "synchronising", "yes")
            .one("out-of-phase-missing");
        Bay::new().silent("out-of-phase-missing");
    }

    #[test]
    fn series_reactors_are_slowed() {
        let bay = Bay::new().set("circuit", "series reactor", "6 ohm");
        assert_eq!(bay.one("series-reactor-trv").kind, FindingKind::Caution);
        bay.clone().set("breaker", "TRV mitigation", "capacitor across reactor").silent("series-reactor-trv");
        bay.clone().set("breaker", "fast TRV class", "yes").silent("series-reactor-trv");
        let small = bay.clone().set("circuit", "series reactor capacitance", "2 nF").one("series-reactor-trv");
        assert!(small.working[0].contains("kHz"), "{:?}", small.working);
        bay.clone().set("circuit", "series reactor capacitance", "500 nF").silent("series-reactor-trv");
        let own = bay.clone().set("circuit", "natural frequency", "20 kHz").one("series-reactor-trv");
        assert!(own.working[0].contains("1/(2 f) of 20 kHz = 25 us"), "{:?}", own.working);
        bay.set("circuit", "natural frequency", "1 kHz").silent("series-reactor-trv");
        Bay::new().silent("series-reactor-trv");
    }

    #[test]
    fn series_capacitors() {
        let bay = Bay::new().set("circuit", "series compensation", "40 %");
        bay.one("series-compensation");
        bay.clone().set("breaker", "TRV mitigation", "none").silent("series-compensation");
        bay.set("circuit", "series compensation", "none").silent("series-compensation");
        Bay::new().silent("series-compensation");
    }

    #[test]
    fn faults_behind_a_transformer() {
        // 100 MVA, 132 kV, 12 %: 3.64 kA, 11.6 % of 31.5 kA.
        let bay = Bay::new()
            .set("circuit", "kind", "transformer")
            .set("circuit", "rated power", "100 MVA")
            .set("circuit", "impedance voltage", "12 %")
            .set("circuit", "connection length", "20 m");
        let finding = bay.one("transformer-limited-fault");
        assert!(finding.message.contains("3.64 kA"), "{}", finding.message);
        bay.clone().set("circuit", "connection length", "50 m").one("transformer-limited-fault");
        bay.clone().set("circuit", "connection length", "51 m").silent("transformer-limited-fault");
        bay.clone().set("circuit", "connection by", "cable").silent("transformer-limited-fault");
        bay.clone().set("circuit", "rated power", "60 MVA").silent("transformer-limited-fault");
        bay.clone().set("breaker", "transformer-limited fault", "no").silent("transformer-limited-fault");
        bay.clone().without("circuit", "connection length").silent("transformer-limited-fault");
        // Where its oscillation is known the envelope decides: 20.9 ohm at 50 Hz are 66.6 mH, which 5 nF slow to 8.7 kHz.
        bay.clone().set("circuit", "capacitance to earth", "5 nF").silent("transformer-limited-fault");
        let fast = bay.clone().set("circuit", "capacitance to earth", "1 nF").one("transformer-limited-fault");
        assert!(fast.working[1].contains("19.5 kHz"), "{:?}", fast.working);
        bay.clone().set("circuit", "natural frequency", "9 kHz").silent("transformer-limited-fault");
        bay.clone().set("circuit", "natural frequency", "14 kHz").one("transformer-limited-fault");
        // A study of the circuit is held against the envelope by another rule.
        bay.set("circuit", "prospective TRV peak", "150 kV").silent("transformer-limited-fault");
    }
}
