//! Rules on more than the duty asks for.
//!
//! Nothing here is wrong. A reason given for the line silences each of them.

use super::timing::HOW_OFTEN;
use super::{Check, EQUAL, Rule, breaking_current, voltage};
use crate::case::Case;
use crate::duty::hundreds;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{breaker, circuit, site, system, tender};
use crate::quantity::{
    ElectricCurrent, ElectricPotential, ElectricalResistance, Length, Physical, Ratio, Time, significant,
};
use crate::source::Place;
use crate::standards::{
    InsulationLevel, PreferredCurrents, RatingSeries, TimeConstants, class_for_operations, usual_continuous_current,
};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &BREAKING_CURRENT_EXCESS,
    &CONTINUOUS_CURRENT_EXCESS,
    &SHORT_TIME_DURATION_EXCESS,
    &DC_TIME_CONSTANT_EXCESS,
    &INSULATION_EXCESS,
    &CLOSING_RESISTOR_NEEDLESS,
    &ENDURANCE_EXCESS,
    &BREAK_TIME_EXCESS,
    &MANY_EXTREMES,
];

/// Whether the rated time constant covers that of the network; a higher current may be chosen where it does not.
fn time_constant_covered(case: &Case<'_>) -> bool {
    let (network, rated) = (case.duty.time_constant.as_ref(), case.duty.rated_time_constant.as_ref());
    network.zip(rated).is_none_or(|(network, rated)| network.value.si() <= rated.value.si() * (1.0 + EQUAL))
}

/// The breaking current is not two or more steps above the duty.
pub static BREAKING_CURRENT_EXCESS: Rule = Rule {
    name: "breaking-current-excess",
    title: "The breaking current is not two or more steps of the series above the duty with its margin.",
    kind: FindingKind::Excess,
    basis: "IEC 62271-100:2021 5.101 (from memory); cost",
    formula: "steps of the series between the smallest value that covers Ik''/(1 - margin) and Isc < 2",
    explanation: "Making, short-time and peak current grow with it, and so does the price. Silent where the network's time constant \
                  exceeds the rated one, which a higher current may be meant to cover, and without a short-circuit current.",
    check: Check::Case(breaking),
};

fn breaking(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(duty)) = (breaking_current(case), case.duty.breaking_duty.as_ref()) else { return };
    let margin = case.tender.quantity::<Ratio>(&tender::SHORT_CIRCUIT_MARGIN);
    let share = margin.as_ref().map_or(0.0, |m| m.value.si()).clamp(0.0, 0.9);
    let series = PreferredCurrents::of(RatingSeries::Breaking, &case.regimes().families());
    let Some(enough) = series.at_or_above(ElectricCurrent::from_si(duty.value.si() / (1.0 - share))) else { return };
    let steps = series.steps(enough, rated.value);
    if steps < case.policy.excess_steps as i64 || !time_constant_covered(case) {
        return;
    }
    let text = rated.like(enough);
    let with = margin.map(|m| format!(" with a margin of {}", m.measure)).unwrap_or_default();
    let message = format!(
        "{} is asked for a duty of {}{with}: {steps} steps of the series more than needed; {text} would do",
        rated.measure,
        duty.value.show()
    );
    let finding = findings.add(&BREAKING_CURRENT_EXCESS, rated.place(), message);
    finding.label("more than the duty asks for").stated(&rated.measure);
    finding.needed(Datum { text: text.clone(), si: Some(enough.si()) }).working(duty.working.to_string());
    for place in duty.places() {
        finding.related(place, "the duty");
    }
    finding.advice("making, short-time and peak current come down with it").replace_by(text);
}

/// The continuous current is not two or more steps above the load.
pub static CONTINUOUS_CURRENT_EXCESS: Rule = Rule {
    name: "continuous-current-excess",
    title: "The continuous current is not two or more steps of the series above the load.",
    kind: FindingKind::Excess,
    basis: "IEC 62271-1:2017 5.5 (from memory); cost",
    formula: "steps of the series between the smallest value that covers the load and Ir < 2",
    explanation: "Counted from the smallest current for which breakers of the rated voltage are usually made (630 A up to 52 kV, \
                  2000 A up to 170 kV, 2500 A above), since a smaller one costs no less. Silent without a load current, and for \
                  capacitor banks, whose current has harmonics upon it.",
    check: Check::Case(continuous),
};

fn continuous(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(load), Some(ur)) = (
        case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT),
        case.duty.load_current.as_ref(),
        case.rated_voltage(),
    ) else {
        return;
    };
    let usual = usual_continuous_current(ur.value).map_or(0.0, ElectricCurrent::si);
    let series = PreferredCurrents::of(RatingSeries::Continuous, &case.regimes().families());
    let Some(enough) = series.at_or_above(ElectricCurrent::from_si(load.value.si().max(usual))) else { return };
    let steps = series.steps(enough, rated.value);
    if steps < case.policy.excess_steps as i64 || case.circuits_of(&["capacitor bank", "filter bank"]).next().is_some()
    {
        return;
    }
    let text = rated.like(enough);
    let stated = load.working.inputs.first().map_or_else(|| load.value.show(), |input| input.text.clone());
    let message =
        format!("{} is asked for a load of {stated}: {steps} steps of the series more than {text}", rated.measure);
    let finding = findings.add(&CONTINUOUS_CURRENT_EXCESS, rated.place(), message);
    finding.label("more than the load asks for").stated(&rated.measure);
    finding.needed(Datum { text: text.clone(), si: Some(enough.si()) }).working(load.working.to_string());
    for place in load.places() {
        finding.related(place, "the largest load");
    }
    finding.replace_by(text);
}

/// Three seconds are not asked for where one does.
pub static SHORT_TIME_DURATION_EXCESS: Rule = Rule {
    name: "short-time-duration-excess",
    title: "3 s are not asked for where backup protection clears within 1 s.",
    kind: FindingKind::Excess,
    basis: "IEC 62271-1:2017 5.8 (from memory); cost",
    formula: "tk <= 1 s where the backup clears in less than 1 s and Ith2 t <= Ik2 x 1 s",
    explanation: "Three times the heat asks for more copper. Silent where the backup takes 1 s or more or is not stated, where 1 s \
                  would not hold the heat, and on 2 s, the duration of the IEEE.",
    check: Check::Case(duration),
};

/// The standard duration of the IEC, s, and the long one (IEC 62271-1 5.8, from memory).
const STANDARD_DURATION: f64 = 1.0;
const LONG_DURATION: f64 = 3.0;

fn duration(case: &Case<'_>, findings: &mut Findings) {
    let (Some(tk), Some(backup)) = (
        case.breaker.quantity::<Time>(&breaker::RATED_DURATION_OF_SHORT_CIRCUIT),
        case.system.quantity::<Time>(&system::BACKUP_CLEARING_TIME),
    ) else {
        return;
    };
    if tk.value.si() < LONG_DURATION * (1.0 - EQUAL) || backup.value.si() >= STANDARD_DURATION * (1.0 - EQUAL) {
        return;
    }
    let withstand = case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_SHORT_TIME_WITHSTAND_CURRENT);
    let heat = case.duty.thermal_duty.as_ref().map(|heat| heat.value.si());
    let held = withstand.as_ref().zip(heat).is_none_or(|(ik, heat)| heat <= ik.value.si().powi(2) * STANDARD_DURATION);
    if !held {
        return;
    }
    let message =
        format!("{} are asked for, and the backup clears within {}: 1 s would do", tk.measure, backup.measure);
    let finding = findings.add(&SHORT_TIME_DURATION_EXCESS, tk.place(), message);
    finding
        .label("longer than the backup takes")
        .stated(&tk.measure)
        .needed(Datum::of(Time::from_si(STANDARD_DURATION)));
    finding.beside(backup.statement, "the backup clearing time");
    // One line may state current and duration together.
    match withstand.filter(|ik| ik.place() == tk.place()) {
        Some(ik) => {
            let current = ik.statement.quantity().map(crate::sheet::QuantityReading::shown).unwrap_or_default();
            finding.replace_by(format!("{current} for 1 s"));
        }
        None => {
            finding.replace_by("1 s");
        }
    }
}

/// A special time constant is not asked for where the standard one covers the network.
pub static DC_TIME_CONSTANT_EXCESS: Rule = Rule {
    name: "dc-time-constant-excess",
    title: "A special DC time constant is not asked for where the standard one covers the network.",
    kind: FindingKind::Excess,
    basis: "IEC 62271-100:2021 5.101 (from memory); cost",
    formula: "rated tau = 45 ms where the network's is not above it",
    explanation: "A special time constant brings the making factor 2.7 and tests of its own. Silent where the network's time constant \
                  is not known, and for generator circuit-breakers, whose standard has its own.",
    check: Check::Case(time_constant),
};

fn time_constant(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(network), Some(standard)) = (
        case.breaker.quantity::<Time>(&breaker::DC_TIME_CONSTANT),
        case.duty.time_constant.as_ref(),
        TimeConstants::standard(),
    ) else {
        return;
    };
    let needless =
        rated.value.si() > standard.si() * (1.0 + EQUAL) && network.value.si() <= standard.si() * (1.0 + EQUAL);
    if !needless || case.is_generator_breaker() {
        return;
    }
    let text = rated.like(standard);
    let message = format!(
        "a time constant of {} is asked for, the network has {}: {text} would do",
        rated.measure,
        network.value.show()
    );
    let finding = findings.add(&DC_TIME_CONSTANT_EXCESS, rated.place(), message);
    finding.label("more than the network has").stated(&rated.measure);
    finding.needed(Datum { text: text.clone(), si: Some(standard.si()) }).working(network.working.to_string());
    for place in network.places() {
        finding.related(place, "the network");
    }
    finding.advice("the factor of making and peak current changes with it").replace_by(text);
}

/// The impulse level is not above every row without a reason.
pub static INSULATION_EXCESS: Rule = Rule {
    name: "insulation-excess",
    title: "The lightning impulse level is not above the highest row of the table at normal altitude.",
    kind: FindingKind::Excess,
    basis: "IEC 62271-1:2017 tables 1 to 4 (from memory); cost",
    formula: "Up <= highest row for Ur where H <= 1000 m",
    explanation: "No type of this rated voltage is tested with more, so that one of a higher voltage would have to be offered. Silent \
                  above 1000 m and where the altitude is not stated, since the level may be corrected for it; and where \
                  insulation-set speaks, since the pair is no row at all.",
    check: Check::Case(insulation),
};

fn insulation(case: &Case<'_>, findings: &mut Findings) {
    let (Some(ur), Some(up), Some(altitude)) = (
        case.rated_voltage(),
        case.breaker.quantity::<ElectricPotential>(&breaker::RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE),
        case.site.quantity::<Length>(&site::ALTITUDE),
    ) else {
        return;
    };
    let mixed = case
        .breaker
        .quantity::<ElectricPotential>(&breaker::RATED_SHORT_DURATION_POWER_FREQUENCY_WITHSTAND_VOLTAGE)
        .is_some_and(|ud| !voltage::is_row_of_any(case, ud.value, up.value));
    if mixed || voltage::corrected_for_altitude(case) {
        return;
    }
    let rows = voltage::rows(case, ur.value);
    let highest = rows.iter().map(|row| row.lightning()).max_by(|a, b| a.si().total_cmp(&b.si()));
    let Some(highest) = highest.filter(|highest| up.value.si() > highest.si() * (1.0 + EQUAL)) else { return };
    let text = significant(highest.si() / 1e3, 4) + " kV";
    let message = format!(
        "{} at {} and {} is above the highest row of the table, {text}",
        up.measure, ur.measure, altitude.measure
    );
    findings
        .add(&INSULATION_EXCESS, up.place(), message)
        .label("above every row")
        .stated(&up.measure)
        .needed(Datum { text: text.clone(), si: Some(highest.si()) })
        .beside(ur.statement, "the rated voltage")
        .beside(altitude.statement, "the altitude")
        .advice("or give the reason for the line")
        .replace_by(text);
}

/// Closing resistors are for long lines.
pub static CLOSING_RESISTOR_NEEDLESS: Rule = Rule {
    name: "closing-resistor-needless",
    title: "Closing resistors are asked for on long lines only.",
    kind: FindingKind::Excess,
    basis: "IEC/TR 62271-306 (from memory); cost",
    formula: "a circuit that is an overhead line of 200 km or more, a compensated cable, a bank or a transformer",
    explanation: "A closing resistor is a second interrupter with a mechanism of its own. On short lines, couplers and reactors it \
                  does nothing. Silent where a line states no length, on banks and transformers, whose inrush it limits, on \
                  compensated circuits, and where no circuit is described.",
    check: Check::Case(resistor),
};

/// From here on the closing of a line asks for measures against overvoltages, m (common practice, no source).
const LONG_LINE: f64 = 200e3;

/// Circuits on which a closing resistor has another use.
const RESISTOR_USEFUL: [&str; 3] = ["capacitor bank", "filter bank", "transformer"];

fn resistor(case: &Case<'_>, findings: &mut Findings) {
    let Some(resistor) = case.breaker.quantity::<ElectricalResistance>(&breaker::CLOSING_RESISTOR) else { return };
    let useful = case.circuits.is_empty()
        || case.circuits.iter().any(|part| match part.word(&circuit::KIND) {
            None => true,
            Some(_) if part.mentions(&circuit::SHUNT_COMPENSATION) => true,
            Some(("overhead line" | "overhead line with cable", _)) => part
                .quantity::<Length>(&circuit::LENGTH)
                .is_none_or(|length| length.value.si() >= LONG_LINE * (1.0 - EQUAL)),
            Some((kind, _)) => RESISTOR_USEFUL.contains(&kind),
        });
    if useful {
        return;
    }
    let message = "a closing resistor is asked for, and no circuit is a long line that needs it";
    let finding = findings.add(&CLOSING_RESISTOR_NEEDLESS, resistor.place(), message);
    finding.label("what for?").stated(&resistor.measure).needed("none");
    for (_, statement) in case.circuits.iter().filter_map(|part| part.word(&circuit::KIND)) {
        finding.beside(statement, "what is switched");
    }
    finding.advice("controlled closing does as well where a study asks for something").replace_by("none");
}

/// Couplers are switched seldom.
pub static ENDURANCE_EXCESS: Rule = Rule {
    name: "endurance-excess",
    title: "No extended endurance is asked of a breaker that is seldom operated.",
    kind: FindingKind::Excess,
    basis: "IEC 62271-100:2021 classes M1, M2, E1, E2 (from memory); cost",
    formula: "bus coupler or bus section, operations over the life within class M1: M1, and E1 without reclosing",
    explanation: "Speaks only of couplers and sections whose operations a day are stated, and within class M1. One type for the whole \
                  station may be cheaper: give that as the reason.",
    check: Check::Case(endurance),
};

fn endurance(case: &Case<'_>, findings: &mut Findings) {
    let couplers = !case.circuits.is_empty()
        && case.circuits.iter().all(|part| {
            part.word(&circuit::KIND).is_some_and(|(kind, _)| matches!(kind, "bus coupler" | "bus section"))
        });
    let Some(operations) =
        case.duty.switching.operations.as_ref().filter(|n| couplers && class_for_operations(n.value.si()) == Some(1))
    else {
        return;
    };
    for letter in ['M', 'E'] {
        let Some((class, _)) = case.breaker.class(&breaker::CLASSES, letter).filter(|(class, _)| class.grade > 1)
        else {
            continue;
        };
        let text = format!("{letter}1");
        let message =
            format!("{class} is asked of a coupler with {} operations over its life", hundreds(operations.value.si()));
        let finding = findings
            .add(&ENDURANCE_EXCESS, class.place, message)
            .label("more than a coupler needs")
            .stated(class.to_string())
            .needed(text.as_str())
            .working(operations.working.to_string())
            .replace_by(text);
        for place in operations.places() {
            finding.related(place, HOW_OFTEN);
        }
    }
}

/// Two cycles are not asked for without need.
pub static BREAK_TIME_EXCESS: Rule = Rule {
    name: "break-time-excess",
    title: "A break time of 2 cycles is asked for only where stability needs it.",
    kind: FindingKind::Excess,
    basis: "IEEE C37.04 interrupting times (from memory); cost",
    formula: "below 300 kV: break time > 2 cycles, unless relay + 3 cycles + margin exceed the critical clearing time",
    explanation: "From 300 kV up 2 cycles are usual and cost nothing. Below, 3 cycles are, and fewer bidders have 2. Silent where the \
                  critical clearing time needs it; a break time below 2 cycles has a rule of its own.",
    check: Check::Case(break_time),
};

/// The class that is taken where nothing asks for more, cycles; and from where 2 cycles are usual, V (common practice, no source).
const FAST_CLASS: f64 = 2.0;
const USUAL_CLASS: f64 = 3.0;
const FAST_USUAL_FROM: f64 = 300e3;

fn break_time(case: &Case<'_>, findings: &mut Findings) {
    let (Some(total), Some(frequency), Some(rated)) =
        (case.breaker.greatest::<Time>(&breaker::BREAK_TIME), case.frequency(), case.rated_voltage())
    else {
        return;
    };
    let (cycles, slack) = (total.value.si() * frequency.si(), total.measure.half_last_digit() * frequency.si());
    let fast = cycles <= FAST_CLASS * (1.0 + EQUAL) && cycles + slack >= FAST_CLASS * (1.0 - EQUAL);
    if !fast || rated.value.si() >= FAST_USUAL_FROM * (1.0 - EQUAL) {
        return;
    }
    let usual = USUAL_CLASS / frequency.si();
    let critical = case.system.quantity::<Time>(&system::CRITICAL_CLEARING_TIME);
    let relay = case.system.greatest::<Time>(&system::RELAY_TIME).map_or(0.0, |relay| relay.value.si());
    if critical.as_ref().is_some_and(|critical| relay + usual + case.policy.clearing_margin > critical.value.si()) {
        return;
    }
    let text = total.like(Time::from_si(usual));
    let message = format!("{} are 2 cycles, and nothing asks for less than 3: {text} would do", total.measure);
    let finding = findings.add(&BREAK_TIME_EXCESS, total.place(), message);
    finding.label("faster than stability asks for").stated(&total.measure);
    finding.needed(Datum { text: text.clone(), si: Some(usual) });
    finding.working(format!("3 / {} = {text}", frequency.show()));
    if let Some(critical) = critical {
        finding.beside(critical.statement, "the critical clearing time");
    }
    finding.advice("or state the critical clearing time that needs it").replace_by(text);
}

/// Few bidders have everything at once.
pub static MANY_EXTREMES: Rule = Rule {
    name: "many-extremes",
    title: "Not everything is asked for at its extreme.",
    kind: FindingKind::Excess,
    basis: "common practice, no source",
    formula: "number of extreme demands < 5",
    explanation: "Each demand alone has its breaker; all together may have none, or one. Counted are: 63 kA or more, 5000 A or more, a \
                  special time constant, 3 s, 2 cycles, out of phase 2.5 with an earthed neutral, closing resistors, the coldest \
                  class, the highest seismic level, and an impulse level above the table. Drop what no duty asks for, or ask the \
                  market first.",
    check: Check::Case(extremes),
};

/// Values from which a demand is at its extreme (common practice, no source).
const EXTREME_BREAKING: f64 = 63e3;
const EXTREME_CONTINUOUS: f64 = 5000.0;
const EXTREME_OUT_OF_PHASE: f64 = 2.5;

fn extremes(case: &Case<'_>, findings: &mut Findings) {
    let at_least = |value: f64, limit: f64| value >= limit * (1.0 - EQUAL);
    let mut found: Vec<(String, Place)> = Vec::new();
    let mut add = |text: String, place: Place| found.push((text, place));
    if let Some(isc) = breaking_current(case).filter(|isc| at_least(isc.value.si(), EXTREME_BREAKING)) {
        add(isc.measure.to_string(), isc.place());
    }
    if let Some(ir) = case
        .breaker
        .quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT)
        .filter(|ir| at_least(ir.value.si(), EXTREME_CONTINUOUS))
    {
        add(ir.measure.to_string(), ir.place());
    }
    if let (Some(tau), Some(standard)) =
        (case.breaker.quantity::<Time>(&breaker::DC_TIME_CONSTANT), TimeConstants::standard())
        && tau.value.si() > standard.si() * (1.0 + EQUAL)
    {
        add(format!("a time constant of {}", tau.measure), tau.place());
    }
    if let Some(tk) = case
        .breaker
        .quantity::<Time>(&breaker::RATED_DURATION_OF_SHORT_CIRCUIT)
        .filter(|tk| at_least(tk.value.si(), LONG_DURATION))
    {
        add(tk.measure.to_string(), tk.place());
    }
    if let (Some(total), Some(frequency)) = (case.breaker.greatest::<Time>(&breaker::BREAK_TIME), case.frequency())
        && total.value.si() * frequency.si() <= FAST_CLASS * (1.0 + EQUAL)
    {
        add(format!("a break time of {}", total.measure), total.place());
    }
    let earthed = case.duty.effectively_earthed.is_some_and(|(earthed, _)| earthed);
    if let Some(factor) = case
        .breaker
        .quantity::<Ratio>(&breaker::OUT_OF_PHASE_VOLTAGE_FACTOR)
        .filter(|factor| earthed && at_least(factor.value.si(), EXTREME_OUT_OF_PHASE))
    {
        add(format!("out of phase {}", significant(factor.value.si(), 2)), factor.place());
    }
    if let Some(resistor) = case.breaker.quantity::<ElectricalResistance>(&breaker::CLOSING_RESISTOR) {
        add("closing resistors".to_owned(), resistor.place());
    }
    if let Some((class @ "minus 50 outdoor", statement)) = case.breaker.word(&breaker::TEMPERATURE_CLASS) {
        add(class.to_owned(), statement.value);
    }
    if let Some(("high", statement)) = case.breaker.word(&breaker::SEISMIC_QUALIFICATION) {
        add("seismic level high".to_owned(), statement.value);
    }
    let rows = case.rated_voltage().map(|ur| voltage::rows(case, ur.value)).unwrap_or_default();
    let top = rows.iter().map(|row| InsulationLevel::lightning(row).si()).fold(0.0, f64::max);
    if let Some(up) = case
        .breaker
        .quantity::<ElectricPotential>(&breaker::RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE)
        .filter(|up| top > 0.0 && up.value.si() > top * (1.0 + EQUAL))
    {
        add(up.measure.to_string(), up.place());
    }
    if found.len() < case.policy.extremes {
        return;
    }
    let texts: Vec<&str> = found.iter().map(|(text, _)| text.as_str()).collect();
    let message =
        format!("{} demands are at their extreme together, which few breakers meet: {}", found.len(), texts.join(", "));
    let finding = findings.add(&MANY_EXTREMES, case.sheet.heading, message);
    finding.label("few bidders have all of it");
    for (text, place) in &found {
        finding.related(*place, text.as_str());
    }
    finding.advice("drop what no duty asks for, or ask the market first");
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const ISC: &str = "rated short-circuit breaking current";
    const IR: &str = "rated continuous current";

    #[test]
    fn breaking_current_beyond_the_duty() {
        let bay = |duty: &str| {
            Bay::new().set("system", "short-circuit current", duty).set(
                "system",
                "single-phase short-circuit current",
                "10 kA",
            )
        };
        let finding = bay("18 kA").set("breaker", ISC, "63 kA").one("breaking-current-excess");
        assert_eq!((finding.kind, finding.edits[0].text.as_str()), (FindingKind::Excess, "20 kA"));
        // Two steps above 20 kA fire, one does not; and the margin counts.
        bay("18 kA").one("breaking-current-excess");
        bay("18 kA").set("breaker", ISC, "25 kA").silent("breaking-current-excess");
        bay("18 kA").set("tender", "short-circuit margin", "20 %").silent("breaking-current-excess");
        bay("18 kA")
            .set("breaker", "reason for rated short-circuit breaking current", "\"one type\"")
            .silent("breaking-current-excess");
        Bay::new().silent("breaking-current-excess");
    }

    #[test]
    fn continuous_current_beyond_the_load() {
        let bay = |load: &str, ir: &str| Bay::new().set("circuit", "load current", load).set("breaker", IR, ir);
        assert_eq!(bay("200 A", "4000 A").one("continuous-current-excess").edits[0].text, "2000 A");
        bay("200 A", "2500 A").silent("continuous-current-excess");
        bay("200 A", "3150 A").one("continuous-current-excess");
        bay("1900 A", "2500 A").silent("continuous-current-excess");
        Bay::new().without("circuit", "load current").set("breaker", IR, "4000 A").silent("continuous-current-excess");
    }

    #[test]
    fn three_seconds_for_a_fast_backup() {
        let bay = |ik: &str, backup: &str| {
            Bay::new().set("breaker", "rated short-time withstand current", ik).set(
                "system",
                "backup clearing time",
                backup,
            )
        };
        assert_eq!(bay("31.5 kA for 3 s", "0.5 s").one("short-time-duration-excess").edits[0].text, "31.5 kA for 1 s");
        bay("31.5 kA for 3 s", "1 s").silent("short-time-duration-excess");
        bay("31.5 kA for 2 s", "0.5 s").silent("short-time-duration-excess");
        let two_lines = bay("31.5 kA", "0.5 s").set("breaker", "rated duration of short-circuit", "3 s");
        assert_eq!(two_lines.one("short-time-duration-excess").edits[0].text, "1 s");
    }

    #[test]
    fn special_time_constants_for_nothing() {
        let bay = |rated: &str, network: &str| {
            Bay::new().set("breaker", "DC time constant", rated).set("system", "DC time constant", network)
        };
        assert_eq!(bay("120 ms", "38 ms").one("dc-time-constant-excess").edits[0].text, "45 ms");
        bay("60 ms", "45 ms").one("dc-time-constant-excess");
        bay("60 ms", "46 ms").silent("dc-time-constant-excess");
        bay("45 ms", "30 ms").silent("dc-time-constant-excess");
    }

    #[test]
    fn levels_above_every_row() {
        let bay = |up: &str| {
            Bay::new()
                .set("breaker", "rated voltage", "245 kV")
                .without("breaker", "rated short-duration power-frequency withstand voltage")
                .set("breaker", "rated lightning impulse withstand voltage", up)
        };
        assert_eq!(bay("1300 kV").one("insulation-excess").edits[0].text, "1050 kV");
        bay("1050 kV").silent("insulation-excess");
        let row = Bay::new().set("breaker", "rated short-duration power-frequency withstand voltage", "325 kV").set(
            "breaker",
            "rated lightning impulse withstand voltage",
            "750 kV",
        );
        row.one("insulation-excess");
        row.silent("insulation-set");
        let mixed = Bay::new()
            .set("breaker", "rated voltage", "36 kV")
            .set("breaker", "rated short-duration power-frequency withstand voltage", "70 kV")
            .set("breaker", "rated lightning impulse withstand voltage", "200 kV");
        mixed.silent("insulation-excess");
        mixed.one("insulation-set");
        bay("1300 kV").set("site", "altitude", "1800 m").silent("insulation-excess");
    }

    #[test]
    fn closing_resistors_are_for_long_lines() {
        let bay = Bay::new().set("breaker", "closing resistor", "400 ohm");
        bay.one("closing-resistor-needless");
        bay.clone().set("circuit", "length", "200 km").silent("closing-resistor-needless");
        bay.clone().set("circuit", "kind", "transformer").silent("closing-resistor-needless");
        bay.clone().set("circuit", "kind", "shunt reactor").one("closing-resistor-needless");
        bay.set("breaker", "closing resistor", "none").silent("closing-resistor-needless");
    }

    #[test]
    fn couplers_are_seldom_switched() {
        let bay =
            |a_day: &str| Bay::new().set("circuit", "kind", "bus coupler").set("circuit", "operations per day", a_day);
        assert_eq!(bay("0.05 per day").one("endurance-excess").edits[0].text, "M1");
        bay("1 per day").silent("endurance-excess");
        Bay::new().set("circuit", "kind", "bus coupler").silent("endurance-excess");
        Bay::new().set("circuit", "operations per day", "0.05 per day").silent("endurance-excess");
    }

    #[test]
    fn two_cycles_without_need() {
        let bay = Bay::new().set("breaker", "break time", "40 ms");
        assert_eq!(bay.one("break-time-excess").edits[0].text, "60 ms");
        let stable = |critical: &str| {
            bay.clone().set("system", "critical clearing time", critical).set("system", "relay time", "20 ms")
        };
        stable("90 ms").silent("break-time-excess");
        stable("100 ms").one("break-time-excess");
        bay.clone().set("breaker", "rated voltage", "420 kV").silent("break-time-excess");
        Bay::new().silent("break-time-excess");
    }

    #[test]
    fn everything_at_once() {
        let four = Bay::new()
            .set("breaker", ISC, "63 kA")
            .set("breaker", IR, "5000 A")
            .set("breaker", "DC time constant", "120 ms")
            .set("breaker", "break time", "40 ms");
        four.silent("many-extremes");
        let finding = four.set("breaker", "closing resistor", "400 ohm").one("many-extremes");
        assert_eq!(finding.related.len(), 5);
        Bay::new().silent("many-extremes");
    }
}
