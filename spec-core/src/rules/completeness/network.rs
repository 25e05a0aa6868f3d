//! What is missing of the network.

use super::{
    Apparatus, Check, Policy, Rule, be, breakers_of, breakers_without, circuits_of, first_and_more, listed,
    mentions_any,
};
use crate::case::Case;
use crate::duty::{Infeeds, Off};
use crate::finding::{Datum, Finding, FindingKind, Findings};
use crate::particular::{Particular, SheetKind, breaker, circuit, system};
use crate::physics::infeed::ZeroSequence;
use crate::physics::short_circuit;
use crate::quantity::{ElectricCurrent, ElectricPotential, Frequency, Physical, Power, Ratio, significant};
use crate::sheet::{Facts, Reading, Set, Sheet, Stated};

/// A system with what it states and the breakers that stand on it.
struct Network<'a> {
    sheet: &'a Sheet,
    facts: &'a Facts,
    breakers: Vec<Apparatus<'a>>,
    set: &'a Set,
}

/// The network of a sheet, where it is a system.
fn network_of<'a>(set: &'a Set, sheet: &'a Sheet) -> Option<Network<'a>> {
    (sheet.kind == SheetKind::System).then(|| Network {
        sheet,
        facts: set.facts(sheet.id),
        breakers: breakers_of(set, "on", sheet.id),
        set,
    })
}

impl Network<'_> {
    /// The highest voltage, else the rated voltage of a breaker, else the nominal voltage.
    fn voltage(&self) -> Option<ElectricPotential> {
        let own = |particular| self.facts.quantity::<ElectricPotential>(particular).map(|stated| stated.value);
        let rated =
            || self.breakers.iter().find_map(|b| b.facts.quantity(&breaker::RATED_VOLTAGE)).map(|stated| stated.value);
        own(&system::HIGHEST_VOLTAGE).or_else(rated).or_else(|| own(&system::NOMINAL_VOLTAGE))
    }

    /// Its infeeds.
    fn infeeds(&self) -> Infeeds {
        let rated = || self.breakers.iter().find_map(|b| b.facts.quantity::<Frequency>(&breaker::RATED_FREQUENCY));
        let frequency = self.facts.quantity(&system::FREQUENCY).or_else(rated).map(|stated| stated.value);
        Infeeds::of(self.set, self.sheet.id, frequency)
    }

    /// Whether its currents follow from infeeds, or would if they said enough; of that another rule speaks.
    fn has_infeeds(&self) -> bool {
        self.set.pointing_at(self.sheet.id, "into").next().is_some() && self.infeeds().feeds()
    }

    /// Whether the three-phase level is stated, in amperes or as power.
    fn has_level(&self) -> bool {
        mentions_any(self.facts, &[&system::SHORT_CIRCUIT_CURRENT, &system::FAULT_LEVEL])
    }

    /// The breaker with the least breaking current among those whose own share is not documented.
    fn weakest(&self) -> Option<(&Apparatus<'_>, Stated<'_, ElectricCurrent>)> {
        self.breakers
            .iter()
            .filter(|b| !b.facts.mentions(&breaker::SHORT_CIRCUIT_CURRENT_THROUGH_THE_BREAKER))
            .filter_map(|b| {
                let isc = b.facts.quantity::<ElectricCurrent>(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT)?;
                Some((b, isc))
            })
            .min_by(|a, b| a.1.value.si().total_cmp(&b.1.value.si()))
    }
}

/// There is a short-circuit level.
pub static DUTY_MISSING: Rule = Rule {
    name: "duty-missing",
    title: "Every breaker stands on a system, and the system has a short-circuit current.",
    kind: FindingKind::Omission,
    basis: "common practice, no source",
    formula: "a sheet system with its short-circuit current, or infeeds that it follows from",
    explanation: "Without the short-circuit current where the breaker stands no rating can be held against anything: breaking, \
                  making, DC component, thermal and TRV checks are off. Silent where infeeds are described, where each breaker's \
                  own share is stated, and where a link is what is missing. Add a system with its voltage, frequency, neutral and \
                  short-circuit current.",
    check: Check::Both(no_system, duty),
};

fn no_system(set: &Set, _: &Policy, findings: &mut Findings) {
    for breakers in breakers_without(set, "on", SheetKind::System) {
        let Some(first) = breakers.first() else { continue };
        let message = format!(
            "no system is described for {}: breaking, making, DC component, thermal, earthing and TRV checks are off",
            first_and_more(&breakers)
        );
        let finding = findings.add(&DUTY_MISSING, first.heading, message);
        finding.label("on no system").advice(
            "add a sheet system with nominal and highest voltage, frequency, neutral, short-circuit current and X/R or DC time constant",
        );
        whose(finding, first);
    }
}

fn duty(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    let Some(network) = network_of(set, sheet) else { return };
    let documented = |b: &Apparatus<'_>| b.facts.mentions(&breaker::SHORT_CIRCUIT_CURRENT_THROUGH_THE_BREAKER);
    if network.breakers.is_empty()
        || network.has_level()
        || network.has_infeeds()
        || network.breakers.iter().all(documented)
    {
        return;
    }
    let other = [&system::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT, &system::TWO_PHASE_TO_EARTH_SHORT_CIRCUIT_CURRENT]
        .into_iter()
        .find_map(|particular| network.facts.statement(particular));
    let title = network.sheet.title();
    let message = if other.is_some() {
        format!(
            "{title} states no three-phase short-circuit current: breaking, making and thermal checks see the other fault only"
        )
    } else {
        format!(
            "{title} states no short-circuit current: breaking, making, DC component, thermal and TRV checks are off"
        )
    };
    let finding = findings.add(&DUTY_MISSING, network.sheet.heading, message);
    finding
        .label("no short-circuit current")
        .advice("add short-circuit current: ... kA, with its study year and X/R or DC time constant");
    if let Some(other) = other {
        finding.beside(other, "the only fault current that is stated");
    }
}

fn whose(finding: &mut Finding, breaker: &Sheet) {
    finding.breaker = Some(breaker.name.clone());
    finding.sheet = Some(breaker.id);
}

/// A fault level has its voltage, and a level its year and configuration.
pub static FAULT_LEVEL_BASIS: Rule = Rule {
    name: "fault-level-basis",
    title: "A fault level in MVA has its voltage, and a short-circuit level its year and its switching state.",
    kind: FindingKind::Omission,
    basis: "IEC 60909-0, IEC 62271-100:2021 5.101, IEEE C37.010 (from memory)",
    formula: "Ik'' = S/(sqrt3 U) at the nominal and at the highest voltage",
    explanation: "The same MVA is a larger current at the nominal voltage than at the highest. Both readings are named; a shortfall \
                  where the larger one exceeds the least breaking current on the system and none is the same round figure. Silent \
                  about the voltage where the current is stated in kA. A study year or a switching state that is not stated is a \
                  remark. Write the current in kA.",
    check: Check::Sheet(fault_level),
};

fn fault_level(set: &Set, sheet: &Sheet, policy: &Policy, findings: &mut Findings) {
    let Some(network) = network_of(set, sheet) else { return };
    without_voltage(&network, policy, findings);
    without_year_or_state(&network, findings);
}

fn without_voltage(network: &Network<'_>, policy: &Policy, findings: &mut Findings) {
    let Some(level) = network.facts.quantity::<Power>(&system::FAULT_LEVEL) else { return };
    let based = level.statement.quantity().is_some_and(|reading| reading.at.is_some());
    if based || network.facts.mentions(&system::SHORT_CIRCUIT_CURRENT) {
        return;
    }
    let mut readings: Vec<(ElectricCurrent, Stated<'_, ElectricPotential>)> = Vec::new();
    for particular in [&system::NOMINAL_VOLTAGE, &system::HIGHEST_VOLTAGE] {
        if let Some(voltage) = network.facts.quantity::<ElectricPotential>(particular).filter(|u| u.value.si() > 0.0) {
            readings.push((short_circuit::current_of_fault_level(level.value, voltage.value), voltage));
        }
    }
    let shown: Vec<String> = readings.iter().map(|(i, u)| format!("{} at {}", i.show(), u.measure)).collect();
    let mut message = format!("the fault level {} has no voltage basis", level.measure);
    if shown.is_empty() {
        message += ", and neither is a voltage of the system stated: no current follows from it";
    } else {
        message.push_str(": ");
        message.push_str(&shown.join(", "));
    }
    let largest = readings.iter().map(|(current, _)| *current).max_by(|a, b| a.si().total_cmp(&b.si()));
    let weakest = network.weakest();
    let short = largest.zip(weakest.as_ref()).filter(|(current, (_, isc))| {
        let apart = |i: &ElectricCurrent| (i.si() - isc.value.si()).abs() / isc.value.si();
        current.si() > isc.value.si() && !readings.iter().any(|(i, _)| apart(i) <= policy.fault_level_tolerance)
    });
    if let Some((current, (_, isc))) = &short {
        let exceeds = format!("; {} exceeds the rated breaking current {}", isc.like(*current), isc.measure);
        message.push_str(&exceeds);
    }
    let finding = findings.add(&FAULT_LEVEL_BASIS, level.place(), message);
    finding.label("at which voltage?").stated(&level.measure);
    for (current, voltage) in &readings {
        finding.working(format!(
            "Ik'' = S/(sqrt3 U) = {}/(1.732 x {}) = {}",
            level.measure,
            voltage.measure,
            current.show()
        ));
        finding.edit(
            format!("write at {}, that is {}", voltage.measure, current.show()),
            level.place().end(),
            format!(" at {}", voltage.measure),
        );
    }
    if let Some((current, (apparatus, isc))) = short {
        finding.kind(FindingKind::Shortfall).needed(Datum::of(current));
        finding.beside(isc.statement, format!("the rated breaking current of {}", apparatus.sheet.title()));
    }
    finding.advice(
        "state the short-circuit current in kA; breaking, making, DC component and thermal checks are off until then",
    );
}

/// What a level holds for.
static VALIDITY: &[(&Particular, &str)] =
    &[(&system::STUDY_YEAR, "study year"), (&system::LEVEL_VALID_WITH, "switching state")];

fn without_year_or_state(network: &Network<'_>, findings: &mut Findings) {
    let level =
        [&system::SHORT_CIRCUIT_CURRENT, &system::FAULT_LEVEL].into_iter().find_map(|p| network.facts.statement(p));
    let Some(level) = level else { return };
    let missing: Vec<_> = VALIDITY.iter().filter(|(particular, _)| !network.facts.mentions(particular)).collect();
    let names: Vec<&str> = missing.iter().map(|(_, name)| *name).collect();
    let labels: Vec<&str> = missing.iter().map(|(particular, _)| particular.label).collect();
    if network.breakers.is_empty() || missing.is_empty() {
        return;
    }
    let message = format!(
        "{} of the short-circuit level {} not stated: nobody can tell how far the level can be relied on",
        listed(&names, "and"),
        be(names.len())
    );
    findings
        .add(&FAULT_LEVEL_BASIS, level.value, message)
        .kind(FindingKind::Remark)
        .label("how long, and in which state?")
        .advice(format!("add {} to {}", listed(&labels, "and"), network.sheet.title()));
}

/// The time constant of the network is known.
pub static DC_TIME_CONSTANT_MISSING: Rule = Rule {
    name: "dc-time-constant-missing",
    title: "The time constant of the network is stated: as such, as X/R, or by its peak current.",
    kind: FindingKind::Remark,
    basis: "IEC 62271-100:2021 5.101 (from memory)",
    formula: "one of tau, X/R, R/X, ip",
    explanation: "For the rating 45 ms are assumed where none is stated; for the network nothing can be assumed, so the checks of DC \
                  component, making current and heat are off. Silent where there is no short-circuit level, and where infeeds are \
                  described. State X/R or the time constant.",
    check: Check::Sheet(time_constant),
};

static TIME_CONSTANT_BY: &[&Particular] =
    &[&system::DC_TIME_CONSTANT, &system::X_OVER_R, &system::R_OVER_X, &system::PEAK_SHORT_CIRCUIT_CURRENT];

fn time_constant(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    let Some(network) = network_of(set, sheet) else { return };
    let level =
        [&system::SHORT_CIRCUIT_CURRENT, &system::FAULT_LEVEL].into_iter().find_map(|p| network.facts.statement(p));
    let Some(level) = level else { return };
    if network.breakers.is_empty() || mentions_any(network.facts, TIME_CONSTANT_BY) || network.has_infeeds() {
        return;
    }
    let message = format!(
        "{} states neither X/R nor a time constant nor a peak current: the checks of DC component, of the making current \
         against the duty, and of the heat are off",
        network.sheet.title()
    );
    findings
        .add(&DC_TIME_CONSTANT_MISSING, level.value, message)
        .label("with which X/R?")
        .advice(format!("add X/R or DC time constant to {}", network.sheet.title()));
}

/// The single-phase level is stated where it may govern.
pub static SINGLE_PHASE_LEVEL_MISSING: Rule = Rule {
    name: "single-phase-level-missing",
    title: "The single-phase short-circuit current is stated where it may be the larger one.",
    kind: FindingKind::Omission,
    basis: "IEC 60909-0 (from memory)",
    formula: "Ik1 > Ik3 wherever Z0 < Z1; needed where Isc < 1.25 Ik3",
    explanation: "Near transformers with an earthed neutral the single-phase current exceeds the three-phase one. An omission above \
                  52 kV with an effectively earthed neutral where the breaking current leaves less than a quarter over Ik3; a \
                  remark at and below 52 kV; silent with more reserve, with another neutral, and where the breaker's own share is \
                  documented. A stated X0/X1 is the largest of all states and so does not settle it. Add Ik1.",
    check: Check::Sheet(single_phase),
};

/// Reserve of the breaking current over Ik3 from which Ik1 is not asked for (common practice, no source).
const SINGLE_PHASE_RESERVE: f64 = 1.25;

/// Up to here systems are mostly cleared of earth-fault current by their neutral (limit of distribution in IEC 62271-1, from memory).
const DISTRIBUTION_TO: f64 = 52e3;

fn single_phase(set: &Set, sheet: &Sheet, policy: &Policy, findings: &mut Findings) {
    let Some(network) = network_of(set, sheet) else { return };
    if network.facts.mentions(&system::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT) || network.has_infeeds() {
        return;
    }
    // One that leaves its current to the duty gets what any other such one on the system gets.
    let open = network.breakers.iter().find(|b| {
        let mut readings = b.facts.all(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT).map(|s| &s.reading);
        readings.any(|reading| *reading == Reading::FromDuty)
    });
    let stated = network.weakest().map(|(b, _)| b);
    let cases = stated.into_iter().chain(open).map(|b| Case::new(set, b.sheet, policy));
    let weakest = cases
        .filter(|case| !case.breaker.mentions(&breaker::SHORT_CIRCUIT_CURRENT_THROUGH_THE_BREAKER))
        .filter_map(|case| {
            let isc = super::super::breaking_current(&case)?.value;
            Some((isc, case))
        })
        .min_by(|a, b| a.0.si().total_cmp(&b.0.si()));
    let Some((_, case)) = weakest else { return };
    let (Some(isc), Some(level)) = (super::super::breaking_current(&case), case.duty.short_circuit_current.as_ref())
    else {
        return;
    };
    let (Some((true, earthed)), Some(voltage)) = (case.duty.effectively_earthed, network.voltage()) else {
        return;
    };
    if isc.value.si() >= level.value.si() * SINGLE_PHASE_RESERVE {
        return;
    }
    let Some(place) = level.places().next() else { return };
    let message = format!(
        "only the three-phase level is given, {}; with an effectively earthed neutral the single-phase current may exceed it, and \
         the rated {} leaves {} %",
        level.value.show(),
        isc.measure,
        significant((isc.value.si() / level.value.si() - 1.0) * 100.0, 2)
    );
    let finding = findings.add(&SINGLE_PHASE_LEVEL_MISSING, place, message);
    if voltage.si() <= DISTRIBUTION_TO * (1.0 + super::super::EQUAL) {
        finding.kind(FindingKind::Remark);
    }
    finding.label("three-phase only").related(earthed, "the earthing of the neutral");
    finding.beside(isc.statement, format!("the rated breaking current of {}", case.sheet.title()));
    if let Some(ratio) = case.system.quantity::<Ratio>(&system::X0_OVER_X1).filter(|ratio| ratio.value.value > 0.0) {
        let estimate = level.value * (3.0 / (2.0 + ratio.value.value));
        finding.working(format!(
            "Ik1 = 3 Ik3/(2 + X0/X1) = 3 x {}/(2 + {}) = {} in the state with the largest X0/X1; more in others",
            level.value.show(),
            significant(ratio.value.value, 3),
            estimate.show()
        ));
    }
    finding.advice(format!("add {} to {}", system::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT.label, network.sheet.title()));
}

/// The earthing of the neutral is stated where ratings hang on it.
pub static NEUTRAL_NOT_STATED: Rule = Rule {
    name: "neutral-not-stated",
    title: "The earthing of the neutral is stated where factors hang on it.",
    kind: FindingKind::Omission,
    basis: "IEC 62271-100:2021 5.102, 5.105; IEC 60071-1 (from memory)",
    formula: "one of neutral, earth-fault factor, X0/X1, Z0/Z1, Ik1 beside Ik3",
    explanation: "First-pole-to-clear factor, capacitive voltage factor and out-of-phase factor follow from it. Silent where none of \
                  them is stated and no circuit brings one, on generator circuit-breakers, and where ratios or the two fault \
                  currents show the earthing. State how the neutral is earthed, or X0/X1.",
    check: Check::Sheet(neutral),
};

static EARTHING_BY: &[&Particular] =
    &[&system::NEUTRAL, &system::EARTH_FAULT_FACTOR, &system::X0_OVER_X1, &system::R0_OVER_X1, &system::Z0_OVER_Z1];

/// Ratings that presume an earthing.
static EARTHING_FOR: &[&Particular] = &[
    &breaker::FIRST_POLE_TO_CLEAR_FACTOR,
    &breaker::CAPACITIVE_VOLTAGE_FACTOR,
    &breaker::OUT_OF_PHASE_VOLTAGE_FACTOR,
    &breaker::RATED_OUT_OF_PHASE_BREAKING_CURRENT,
];

/// Circuits whose capacitive voltage factor hangs on the earthing.
static CAPACITIVE: &[&str] =
    &["overhead line", "cable", "overhead line with cable", "cable network", "capacitor bank", "filter bank"];

fn neutral(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    let Some(network) = network_of(set, sheet) else { return };
    let currents = [&system::SHORT_CIRCUIT_CURRENT, &system::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT];
    let by_currents = currents.iter().all(|current| network.facts.mentions(current));
    if by_currents || mentions_any(network.facts, EARTHING_BY) {
        return;
    }
    // The infeeds tell the earthing, or infeed-incomplete tells what they lack for it.
    let infeeds = network.infeeds();
    let off = infeeds.is_off(Off::Earth) || infeeds.is_off(Off::Everything);
    if off || infeeds.seen.as_ref().is_some_and(|seen| seen.infeed.zero() != ZeroSequence::Unknown) {
        return;
    }
    let asks: Vec<_> = network
        .breakers
        .iter()
        .filter(|b| !is_generator_breaker(b.facts))
        .filter_map(|b| EARTHING_FOR.iter().find_map(|p| b.facts.statement(p)))
        .collect();
    let circuits = circuits_of(set, &network.breakers);
    let by_circuit = circuits.iter().any(|circuit| {
        let capacitive = circuit.word(&circuit::KIND).is_some_and(|(kind, _)| CAPACITIVE.contains(&kind));
        let two_sources = [&circuit::SOURCE_AT_FAR_END, &circuit::SYNCHRONISING];
        capacitive || two_sources.iter().any(|p| circuit.yes_no(p).is_some_and(|(yes, _)| yes))
    });
    let generators_only =
        !network.breakers.is_empty() && network.breakers.iter().all(|b| is_generator_breaker(b.facts));
    if asks.is_empty() && (!by_circuit || generators_only) {
        return;
    }
    let what = asks.first().map_or_else(
        || "first-pole-to-clear, capacitive and out-of-phase factors hang on it".to_owned(),
        |statement| format!("the {} hangs on it", statement.particular.label),
    );
    let message = format!(
        "nothing says how the neutral of {} is earthed, and {what}: the checks of these factors are off",
        network.sheet.title()
    );
    let finding = findings.add(&NEUTRAL_NOT_STATED, network.sheet.heading, message);
    finding.label("neutral not stated").advice(format!(
        "add neutral (solidly, effectively or impedance earthed, resonant earthed, isolated) or X0/X1 to {}",
        network.sheet.title()
    ));
    for statement in asks {
        finding.beside(statement, "presumes an earthing");
    }
}

fn is_generator_breaker(facts: &Facts) -> bool {
    facts.words(&breaker::CONSTRUCTION).is_some_and(|(words, _)| words.contains(&"generator circuit-breaker"))
}

/// Below 100 kV it is known what leaves the busbar.
pub static NETWORK_KIND_MISSING: Rule = Rule {
    name: "network-kind-missing",
    title: "Below 100 kV the text says whether lines or cables leave the busbar.",
    kind: FindingKind::Omission,
    basis: "IEC 62271-100:2021 classes S1 and S2 (from memory)",
    formula: "connection stated for Ur < 100 kV",
    explanation: "The TRV of a busbar with cables only rises much more slowly than that of one with lines: class S1 or S2. Silent \
                  from 100 kV up, where every breaker asks for the harder S2, where a circuit is an overhead line and so tells, and \
                  on generator circuit-breakers. State the connection in the system.",
    check: Check::Sheet(network_kind),
};

/// The classes of the TRV end here (IEC 62271-100, from memory).
const TRV_CLASSES_BELOW: f64 = 100e3;

/// The circuit that makes a system a line system; a line behind a cable does not.
const DIRECT_LINE: &str = "overhead line";

fn network_kind(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    let Some(network) = network_of(set, sheet) else { return };
    let Some(voltage) = network.voltage() else { return };
    if voltage.si() >= TRV_CLASSES_BELOW || network.facts.mentions(&system::CONNECTION) {
        return;
    }
    let is_line = |circuit: &Facts| circuit.word(&circuit::KIND).is_some_and(|(kind, _)| kind == DIRECT_LINE);
    if circuits_of(set, &network.breakers).into_iter().any(is_line) {
        return;
    }
    let open = |b: &&Apparatus<'_>| {
        let hardest = b.facts.class(&breaker::CLASSES, 'S').is_some_and(|(class, _)| class.grade >= 2);
        !hardest && !is_generator_breaker(b.facts)
    };
    let Some(first) = network.breakers.iter().find(open) else { return };
    let message = format!(
        "{} does not say whether lines or cables leave the busbar: below 100 kV the TRV class, S1 or S2, depends on it",
        network.sheet.title()
    );
    let finding = findings.add(&NETWORK_KIND_MISSING, network.sheet.heading, message);
    finding.label("lines or cables?");
    if let Some((class, _)) = first.facts.class(&breaker::CLASSES, 'S') {
        finding.related(class.place, "a class that only fits cables");
    }
    finding.advice(format!(
        "add connection: overhead lines, cables, or overhead lines and cables to {}",
        network.sheet.title()
    ));
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::rules::testing::Bay;

    const SECOND: &str = "breaker Other on Ring at Yard like LineBay\n    quantity: 1\ncircuit Line2 for Other\n    kind: overhead line\n    \
                          auto-reclosing: three-phase\n    auto-reclosing dead time: 0.3 s\n";

    fn no_level() -> Bay {
        Bay::new().without("system", "short-circuit current").without("system", "single-phase short-circuit current")
    }

    fn medium_voltage() -> Bay {
        Bay::new().set("system", "nominal voltage", "33 kV").set("system", "highest voltage", "36 kV").set(
            "breaker",
            "rated voltage",
            "36 kV",
        )
    }

    #[test]
    fn no_system_is_told_once() {
        let bay = Bay::new().without_sheet("system").heading("breaker", "breaker LineBay at Yard");
        let found = bay.clone().and("breaker Second at Yard\n    quantity: 1\n").one("duty-missing");
        assert!(found.message.contains("breaker LineBay and 1 more"), "{}", found.message);
        bay.silent("neutral-not-stated");
        bay.silent("dc-time-constant-missing");
    }

    #[test]
    fn a_system_without_a_level() {
        let found = no_level().and(SECOND).one("duty-missing");
        assert!(found.message.contains("TRV checks are off"), "{}", found.message);
        no_level().silent("dc-time-constant-missing");
        let only_one_phase = Bay::new().without("system", "short-circuit current").one("duty-missing");
        assert!(only_one_phase.message.contains("no three-phase"), "{}", only_one_phase.message);
    }

    #[test]
    fn a_level_from_elsewhere_is_a_level() {
        no_level().set("system", "fault level", "7000 MVA at 145 kV").silent("duty-missing");
        no_level().set("breaker", "short-circuit current through the breaker", "20 kA").silent("duty-missing");
        no_level()
            .and("infeed Grid into Ring\n    kind: network\n    short-circuit current: 28 kA\n")
            .silent("duty-missing");
        Bay::new().set("system", "short-circuit current", "to be confirmed").silent("duty-missing");
        Bay::new().and("system Idle\n    nominal voltage: 33 kV\n").silent("duty-missing");
    }

    #[test]
    fn a_fault_level_without_its_voltage_in_both_readings() {
        let bay = no_level()
            .set("system", "nominal voltage", "110 kV")
            .set("system", "highest voltage", "123 kV")
            .set("system", "fault level", "7500 MVA")
            .set("breaker", "rated short-circuit breaking current", "40 kA");
        let found = bay.one("fault-level-basis");
        assert_eq!(found.kind, FindingKind::Omission);
        assert!(found.message.contains("39.4 kA at 110 kV, 35.2 kA at 123 kV"), "{}", found.message);
        assert_eq!(found.edits.len(), 2);
        let short = bay.set("breaker", "rated short-circuit breaking current", "31.5 kA").one("fault-level-basis");
        assert_eq!(short.kind, FindingKind::Shortfall);
        assert!(short.message.contains("39.4 kA exceeds the rated breaking current 31.5 kA"), "{}", short.message);
    }

    /// 4000 MVA is the round figure of 31.5 kA at 72.5 kV, so that 33.5 kA at 69 kV is no shortfall.
    #[test]
    fn a_round_figure_of_the_rating_is_no_shortfall() {
        let bay = no_level().set("system", "nominal voltage", "69 kV").set("system", "highest voltage", "72.5 kV").set(
            "system",
            "fault level",
            "4000 MVA",
        );
        assert_eq!(bay.one("fault-level-basis").kind, FindingKind::Omission);
        bay.set("system", "fault level", "4000 MVA at 69 kV").silent("fault-level-basis");
        Bay::new().set("system", "fault level", "7100 MVA").silent("fault-level-basis");
    }

    #[test]
    fn year_and_state_are_one_remark() {
        let bay = Bay::new().without("system", "study year").without("system", "level valid with").and(SECOND);
        let found = bay.one("fault-level-basis");
        assert_eq!(found.kind, FindingKind::Remark);
        assert!(found.message.contains("study year and switching state"), "{}", found.message);
    }

    #[test]
    fn a_network_without_time_constant() {
        let bay = Bay::new().without("system", "DC time constant");
        assert_eq!(bay.one("dc-time-constant-missing").kind, FindingKind::Remark);
        for (label, value) in
            [("X/R", "14"), ("peak short-circuit current", "70 kA"), ("R/X", "0.07"), ("X/R", "later")]
        {
            bay.clone().set("system", label, value).silent("dc-time-constant-missing");
        }
    }

    #[test]
    fn the_single_phase_level_where_it_may_govern() {
        let bay = Bay::new().without("system", "single-phase short-circuit current");
        let found = bay.clone().and(SECOND).one("single-phase-level-missing");
        assert_eq!(found.kind, FindingKind::Omission);
        assert!(found.working.iter().any(|line| line.contains("18.5 kA")), "{:?}", found.working);
        bay.clone().set("system", "short-circuit current", "25.2 kA").silent("single-phase-level-missing");
        bay.clone().set("system", "short-circuit current", "25.3 kA").one("single-phase-level-missing");
        bay.clone()
            .without("system", "X0/X1")
            .set("system", "neutral", "isolated")
            .silent("single-phase-level-missing");
        bay.set("breaker", "short-circuit current through the breaker", "20 kA").silent("single-phase-level-missing");
    }

    #[test]
    fn the_single_phase_level_of_distribution_is_a_remark() {
        let bay = medium_voltage().without("system", "single-phase short-circuit current");
        assert_eq!(bay.one("single-phase-level-missing").kind, FindingKind::Remark);
    }

    #[test]
    fn a_neutral_that_nothing_shows() {
        let bay = Bay::new()
            .without("system", "neutral")
            .without("system", "X0/X1")
            .without("system", "single-phase short-circuit current");
        let found = bay.clone().and(SECOND).one("neutral-not-stated");
        assert!(found.message.contains("first-pole-to-clear factor hangs on it"), "{}", found.message);
        bay.clone().set("system", "earth-fault factor", "1.4").silent("neutral-not-stated");
        bay.clone().set("system", "neutral", "to be confirmed").silent("neutral-not-stated");
        bay.clone().set("system", "single-phase short-circuit current", "24 kA").silent("neutral-not-stated");
        bay.silent("single-phase-level-missing");
    }

    #[test]
    fn a_neutral_that_nothing_hangs_on() {
        let bay = Bay::new()
            .without("system", "neutral")
            .without("system", "X0/X1")
            .without("system", "single-phase short-circuit current")
            .without("breaker", "first-pole-to-clear factor")
            .without("breaker", "rated out-of-phase breaking current")
            .without("breaker", "out-of-phase voltage factor");
        bay.one("neutral-not-stated");
        bay.set("circuit", "kind", "transformer")
            .set("circuit", "source at far end", "no")
            .silent("neutral-not-stated");
    }

    #[test]
    fn what_leaves_the_busbar_below_100_kv() {
        let second = SECOND.replace("overhead line", "transformer");
        let bay = medium_voltage().without("system", "connection").set("circuit", "kind", "cable");
        bay.clone().and(&second).one("network-kind-missing");
        bay.clone().and(SECOND).silent("network-kind-missing");
        bay.clone().set("breaker", "classes", "C2, M2, S1").one("network-kind-missing");
        bay.clone().set("system", "connection", "later").silent("network-kind-missing");
        bay.set("breaker", "classes", "C2, M2, S2").silent("network-kind-missing");
        Bay::new().without("system", "connection").silent("network-kind-missing");
        let edge = Bay::new().without("system", "connection").set("circuit", "kind", "cable");
        edge.clone().set("system", "highest voltage", "100 kV").silent("network-kind-missing");
        edge.set("system", "highest voltage", "72.5 kV").one("network-kind-missing");
    }
}
