//! Rules on several breakers of one station.

use super::{Check, EQUAL, Policy, Rule, breaking_current};
use crate::case::Case;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{Kind, Particular, Sense, SheetKind, breaker, circuit, system};
use crate::quantity::{ElectricCurrent, ElectricPotential, Physical};
use crate::sheet::{Facts, Set, Sheet, Stated, Statement};
use crate::standards::{PreferredCurrents, RatingSeries, rated_at_or_above, steps_between_voltages};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&BUS_DUTY, &COUPLER_CURRENT, &SPARE_ENVELOPE, &COPIED_BAY, &SYSTEM_MISMATCH, &SPLIT_BUS];

/// The other breakers on the system of this one.
fn neighbours<'a>(case: &'a Case<'_>) -> Vec<(&'a Sheet, &'a Facts)> {
    let Some(system) = case.sheet.target("on") else { return Vec::new() };
    case.set
        .pointing_at(system, "on")
        .filter(|sheet| sheet.id != case.sheet.id && sheet.kind == SheetKind::Breaker)
        .map(|sheet| (sheet, case.set.facts(sheet.id)))
        .collect()
}

/// Breakers on one bus break the same.
pub static BUS_DUTY: Rule = Rule {
    name: "bus-duty",
    title: "Breakers on one system of which no short-circuit current is stated have one breaking current.",
    kind: FindingKind::Caution,
    basis: "IEC 60909-0 (from memory); common practice",
    formula: "Isc equal for all breakers of the system",
    explanation: "A fault on the bus is the same for all of them. Where the system states its current, each breaker is held against \
                  that by breaking-current-below-duty, and this is silent. Silent too where the breaker's own share is documented.",
    check: Check::Case(bus_duty),
};

fn bus_duty(case: &Case<'_>, findings: &mut Findings) {
    let (Some(own), None) = (breaking_current(case), case.duty.breaking_duty.as_ref()) else { return };
    if [&system::SHORT_CIRCUIT_CURRENT, &system::FAULT_LEVEL].into_iter().any(|p| case.system.mentions(p)) {
        return;
    }
    let neighbours = neighbours(case);
    let highest = neighbours
        .iter()
        .filter_map(|(sheet, facts)| {
            let stated = facts.quantity::<ElectricCurrent>(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT)?;
            Some((sheet, stated))
        })
        .max_by(|a, b| a.1.value.si().total_cmp(&b.1.value.si()));
    let Some((sheet, highest)) = highest.filter(|(_, high)| own.value.si() < high.value.si() * (1.0 - EQUAL)) else {
        return;
    };
    let text = own.like(highest.value);
    let message = format!(
        "{} is asked for here and {} for {} on the same system: a fault on the bus is the same for both",
        own.measure,
        highest.measure,
        sheet.title()
    );
    findings
        .add(&BUS_DUTY, own.place(), message)
        .label("less than its neighbour")
        .stated(&own.measure)
        .needed(Datum { text: text.clone(), si: Some(highest.value.si()) })
        .related(highest.place(), "the neighbour")
        .advice("state the short-circuit current of the system; making, short-time and peak current follow")
        .replace_by(text);
}

/// A coupler carries what a bay carries.
pub static COUPLER_CURRENT: Rule = Rule {
    name: "coupler-current",
    title: "A coupler without a load of its own carries the largest load of a bay on its system.",
    kind: FindingKind::Shortfall,
    basis: "common practice, no source",
    formula: "Ir of the coupler >= largest load and emergency load of the other breakers on the system",
    explanation: "When a bay is transferred its whole load flows through the coupler. Where the coupler states a load of its own, \
                  continuous-current-below-load compares that, and this is silent. Bus sections are not judged: their load \
                  depends on what hangs on either side.",
    check: Check::Case(coupler),
};

fn coupler(case: &Case<'_>, findings: &mut Findings) {
    let (Some((_, kind)), Some(rated), None) = (
        case.circuits_of(&["bus coupler"]).next().and_then(|part| part.word(&circuit::KIND)),
        case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT),
        case.duty.load_current.as_ref(),
    ) else {
        return;
    };
    let mut largest: Option<(ElectricCurrent, String, crate::source::Place, String)> = None;
    for (sheet, _) in neighbours(case) {
        let circuits = case.set.pointing_at(sheet.id, "for").filter(|circuit| circuit.kind == SheetKind::Circuit);
        for facts in circuits.map(|circuit| case.set.facts(circuit.id)) {
            for particular in [&circuit::LOAD_CURRENT, &circuit::EMERGENCY_LOAD_CURRENT] {
                let Some(load) = facts.quantity::<ElectricCurrent>(particular) else { continue };
                if largest.as_ref().is_none_or(|(old, ..)| load.value > *old) {
                    largest = Some((load.value, load.measure.to_string(), load.place(), sheet.title()));
                }
            }
        }
    }
    let Some((load, text, place, bay)) = largest else { return };
    if rated.value.si() >= load.si() * (1.0 - EQUAL) {
        return;
    }
    let message = format!(
        "the coupler carries {}, and {bay} carries {text}, which flows through it on a transfer",
        rated.measure
    );
    let finding = findings.add(&COUPLER_CURRENT, rated.place(), message);
    finding.label("below the load of a bay").stated(&rated.measure).related(place, "the load of the bay");
    finding.beside(kind, "a bus coupler");
    if let Some(needed) = PreferredCurrents::of(RatingSeries::Continuous, &case.regimes().families()).at_or_above(load)
    {
        let text = rated.like(needed);
        finding.needed(Datum { text: text.clone(), si: Some(needed.si()) }).replace_by(text);
    }
}

/// A spare covers what it is the spare for.
pub static SPARE_ENVELOPE: Rule = Rule {
    name: "spare-envelope",
    title: "A spare covers the highest of each line of the breakers for which it is the spare.",
    kind: FindingKind::Remark,
    basis: "common practice, no source",
    formula: "for each rating: spare >= largest of the breakers named",
    explanation: "Compares every quantity for which more is better. The breakers are those of the line spare for; without it, of a \
                  circuit of the kind spare, all on the same system. What the spare does not state at all is told too.",
    check: Check::Case(spare),
};

fn spare(case: &Case<'_>, findings: &mut Findings) {
    let named = case.breaker.list(&breaker::SPARE_FOR);
    let others: Vec<(&Sheet, &Facts)> = match &named {
        Some((items, _)) => case
            .set
            .in_reach(case.sheet.file(), SheetKind::Breaker)
            .filter(|sheet| sheet.id != case.sheet.id && items.iter().any(|item| item.text == sheet.name))
            .map(|sheet| (sheet, case.set.facts(sheet.id)))
            .collect(),
        None if case.circuits_of(&["spare"]).next().is_some() => neighbours(case),
        None => return,
    };
    let place = named.map_or(case.sheet.heading, |(_, statement)| statement.value);
    let mut short = Vec::new();
    let mut edits = Vec::new();
    let mut related = Vec::new();
    for particular in breaker::GROUPS.iter().copied().flatten().copied().filter(|p| is_rating(p)) {
        let highest = others
            .iter()
            .filter_map(|(_, facts)| facts.statement(particular))
            .filter_map(|statement| Some((statement, statement.quantity()?.upper().si?)))
            .max_by(|a, b| a.1.total_cmp(&b.1));
        let Some((statement, value)) = highest else { continue };
        let Some(reading) = statement.quantity() else { continue };
        let shown = reading.upper().to_string().trim_end().to_owned();
        match case.breaker.statement(particular) {
            None => short.push(format!("{} {shown} (not stated)", particular.label)),
            Some(own) => {
                let Some(have) = own.quantity().filter(|own| own.dimension() == reading.dimension()) else { continue };
                if have.upper().si.is_none_or(|have| have >= value * (1.0 - EQUAL)) {
                    continue;
                }
                short.push(format!("{} {shown}", particular.label));
                // A line that states current and duration together is not rewritten.
                if case.breaker.statements().iter().filter(|s| s.value == own.value).count() == 1 {
                    edits.push((own.value, reading.shown()));
                }
            }
        }
        related.push(statement.value);
    }
    if short.is_empty() {
        return;
    }
    let message = format!("the spare does not cover what it is the spare for: {}", short.join(", "));
    let finding = findings.add(&SPARE_ENVELOPE, place, message);
    finding.label("does not cover all of them").needed(short.join(", "));
    for place in related {
        finding.related(place, "the highest of its line");
    }
    // Edits are alternatives, so that one is given only where it cures all.
    if let ([(place, text)], 1) = (edits.as_slice(), short.len()) {
        finding.edit(format!("write {text}"), *place, text.as_str());
    }
    finding.advice("give the spare a schedule of its own with the highest of each line");
}

/// Whether more of it is better, as a number.
fn is_rating(particular: &Particular) -> bool {
    particular.sense == Sense::AtLeast
        && !particular.carried
        && matches!(particular.kind, Kind::Quantity(_) | Kind::Ratio)
}

/// The duties of a line bay are not copied to a reactor or a bank.
pub static COPIED_BAY: Rule = Rule {
    name: "copied-bay",
    title: "The duties of a line bay are not carried over to the bay of a reactor or a bank.",
    kind: FindingKind::Caution,
    basis: "common practice, no source",
    formula: "fewer than two of: rapid reclosing, short-line fault, line-charging current, out of phase",
    explanation: "One such rating may be meant, two show that the schedule of a line was copied. Speaks of breakers that switch \
                  only reactors and capacitor or filter banks; then the rules on single needless ratings are silent.",
    check: Check::Case(copied),
};

/// Bays that have nothing of a line.
const NOT_LINES: [&str; 3] = ["shunt reactor", "capacitor bank", "filter bank"];

/// The lines of a line bay's schedule on a bay without a line; fewer than two prove nothing.
pub(super) fn copied_lines<'a>(case: &'a Case<'_>) -> Vec<(&'static str, &'a Statement)> {
    let others = !case.circuits.is_empty()
        && case
            .circuits
            .iter()
            .all(|part| part.word(&circuit::KIND).is_some_and(|(kind, _)| NOT_LINES.contains(&kind)));
    if !others {
        return Vec::new();
    }
    let sequence = case.breaker.sequence(&breaker::RATED_OPERATING_SEQUENCE).and_then(|(sequence, statement)| {
        let first = sequence.pauses().next().and_then(|pause| pause.measure).and_then(|measure| measure.si);
        (sequence.recloses() && first.is_some_and(|first| first < RAPID)).then_some(statement)
    });
    let fault = case.breaker.yes_no(&breaker::SHORT_LINE_FAULT).and_then(|(yes, s)| yes.then_some(s));
    let lines = [
        ("rapid reclosing", sequence),
        ("short-line fault", fault),
        ("line-charging current", case.breaker.statement(&breaker::RATED_LINE_CHARGING_BREAKING_CURRENT)),
        ("out of phase", case.breaker.statement(&breaker::RATED_OUT_OF_PHASE_BREAKING_CURRENT)),
    ];
    let found: Vec<_> = lines.into_iter().filter_map(|(what, statement)| statement.map(|s| (what, s))).collect();
    if found.len() < 2 { Vec::new() } else { found }
}

/// A pause below this is a rapid reclosure, s (common practice, no source).
const RAPID: f64 = 10.0;

fn copied(case: &Case<'_>, findings: &mut Findings) {
    let found = copied_lines(case);
    let Some((kind, statement)) = case.circuits.first().and_then(|part| part.word(&circuit::KIND)) else { return };
    if found.is_empty() {
        return;
    }
    let said: Vec<&str> = found.iter().map(|(what, _)| *what).collect();
    let message = format!("the bay switches a {kind} and asks for {}: copied from a line bay?", said.join(", "));
    let finding = findings.add(&COPIED_BAY, statement.value, message);
    finding.label("duties of a line").related(case.sheet.heading, "the breaker");
    for (what, statement) in found {
        finding.beside(statement, what);
    }
    finding.advice("give the bay its own schedule, with the duties of what it switches");
}

/// A breaker is linked to the system of its voltage.
pub static SYSTEM_MISMATCH: Rule = Rule {
    name: "system-mismatch",
    title: "A breaker stands on the system of its own voltage level.",
    kind: FindingKind::Contradiction,
    basis: "common practice, no source",
    formula: "Ur within two steps above Um and not below it, or within a factor of 2 where there is no other system",
    explanation: "Every check against the wrong system is wrong. Where the rated voltage does not fit the system and another one of \
                  the set fits it, or where it is off by more than a factor of two, the link is what is wrong, and the rules on the \
                  rated voltage are silent. A reason given for the rated voltage silences this.",
    check: Check::Case(mismatch),
};

/// Beyond this factor a voltage is of another level (common practice, no source).
const OTHER_LEVEL: f64 = 2.0;

/// What the breaker is linked to, and the system that would fit, where the link is wrong.
struct WrongSystem<'a> {
    rated: Stated<'a, ElectricPotential>,
    system: Stated<'a, ElectricPotential>,
    other: Option<&'a Sheet>,
}

fn highest_voltage(facts: &Facts) -> Option<Stated<'_, ElectricPotential>> {
    facts.quantity(&system::HIGHEST_VOLTAGE).or_else(|| facts.quantity(&system::NOMINAL_VOLTAGE))
}

fn wrong_system<'a>(case: &'a Case<'_>) -> Option<WrongSystem<'a>> {
    let (rated, system) = (case.rated_voltage()?, highest_voltage(&case.system)?);
    let families = case.regimes().families();
    let fits = |highest: ElectricPotential| {
        rated.value.si() >= highest.si() * (1.0 - EQUAL)
            && steps_between_voltages(highest, rated.value, &families) < case.policy.excess_steps as i64
    };
    if fits(system.value) || case.breaker.has_reason(&breaker::RATED_VOLTAGE) {
        return None;
    }
    let other = case.set.in_reach(case.sheet.file(), SheetKind::System).find(|sheet| {
        let facts = case.set.facts(sheet.id);
        highest_voltage(facts).is_some_and(|highest| {
            rated_at_or_above(highest.value, &families).is_some_and(|r| (r.si() / rated.value.si() - 1.0).abs() < EQUAL)
        })
    });
    let ratio = rated.value.si() / system.value.si();
    let far = !(1.0 / OTHER_LEVEL..=OTHER_LEVEL).contains(&ratio);
    (other.is_some() || far).then_some(WrongSystem { rated, system, other })
}

/// Whether the breaker is linked to the system of another voltage level.
pub(super) fn stands_on_wrong_system(case: &Case<'_>) -> bool {
    wrong_system(case).is_some()
}

fn mismatch(case: &Case<'_>, findings: &mut Findings) {
    let Some(WrongSystem { rated, system, other }) = wrong_system(case) else { return };
    let name = case.system.sheet.map(Sheet::title).unwrap_or_default();
    let message = format!("a breaker for {} stands on {name} of {}", rated.measure, system.measure);
    let link = case.sheet.links.iter().find(|(link, _)| link.word == "on");
    let finding = findings.add(&SYSTEM_MISMATCH, rated.place(), message);
    finding
        .label("of another voltage level")
        .stated(&rated.measure)
        .beside(system.statement, "the voltage of the system");
    finding.related(case.sheet.heading, "the link to the system");
    match (other, link) {
        (Some(other), Some((_, place))) => {
            finding.needed(other.title()).advice(format!("link the breaker to {}", other.title()));
            finding.edit(format!("write on {}", other.name), *place, format!("on {}", other.name));
        }
        _ => {
            finding.advice("give the breaker the system of its own voltage level");
        }
    }
}

/// A level that holds with an open bus section is kept by an interlock.
pub static SPLIT_BUS: Rule = Rule {
    name: "split-bus",
    title: "A short-circuit level that holds with the bus section open only is kept by an interlock.",
    kind: FindingKind::Caution,
    basis: "common practice, no source",
    formula: "level valid with: bus section open -> interlocked: yes",
    explanation: "Somebody will close the section, and then both sides feed the fault. Silent where the text says that it is \
                  interlocked, and where the level holds with everything closed.",
    check: Check::Sheet(split_bus),
};

fn split_bus(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    if sheet.kind != SheetKind::System {
        return;
    }
    let facts = set.facts(sheet.id);
    let Some(("bus section open", statement)) = facts.word(&system::LEVEL_VALID_WITH) else { return };
    let interlocked = facts.yes_no(&system::INTERLOCKED);
    if interlocked.is_some_and(|(yes, _)| yes) || (interlocked.is_none() && facts.mentions(&system::INTERLOCKED)) {
        return;
    }
    let level = facts.statement(&system::SHORT_CIRCUIT_CURRENT).or_else(|| facts.statement(&system::FAULT_LEVEL));
    let shown = facts.quantity::<ElectricCurrent>(&system::SHORT_CIRCUIT_CURRENT).map(|ik| ik.measure.to_string());
    let message = format!(
        "{} holds with the bus section open only, and no interlock keeps it open",
        shown.unwrap_or_else(|| "the short-circuit level".to_owned())
    );
    let finding = findings.add(&SPLIT_BUS, statement.value, message);
    finding.label("who keeps it open?").stated("bus section open");
    if let Some(level) = level {
        finding.beside(level, "the level");
    }
    if let Some((_, statement)) = interlocked {
        finding.beside(statement, "not interlocked");
    }
    finding.advice("add interlocked: yes if the section cannot be closed, or state the level with it closed");
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const COUPLER: &str = "breaker Coupler on Ring at Yard like LineBay\n    quantity: 1\n";
    const COUPLING: &str = "circuit Coupling for Coupler\n    kind: bus coupler\n";

    fn with_coupler(lines: &str) -> Bay {
        Bay::new().and(&format!("{COUPLER}{lines}{COUPLING}"))
    }

    #[test]
    fn one_bus_one_duty() {
        let unknown = |bay: Bay| {
            bay.without("system", "short-circuit current").without("system", "single-phase short-circuit current")
        };
        let low = with_coupler("    rated short-circuit breaking current: 25 kA\n");
        let finding = unknown(low.clone()).one("bus-duty");
        assert_eq!((finding.kind, finding.edits[0].text.as_str()), (FindingKind::Caution, "31.5 kA"));
        low.silent("bus-duty");
        unknown(with_coupler("")).silent("bus-duty");
        unknown(Bay::new()).silent("bus-duty");
    }

    #[test]
    fn a_coupler_carries_a_bay() {
        let coupler = |ir: &str| with_coupler(&format!("    rated continuous current: {ir}\n"));
        let finding = coupler("800 A").one("coupler-current");
        assert_eq!(finding.edits[0].text, "1250 A");
        coupler("1250 A").silent("coupler-current");
        // Exactly the load, and a load of the coupler's own.
        coupler("1150 A").silent("coupler-current");
        coupler("800 A").and("    load current: 700 A\n").silent("coupler-current");
    }

    #[test]
    fn a_spare_covers_the_highest_of_each_line() {
        let spare = |lines: &str| {
            Bay::new().and(&format!("breaker Spare on Ring at Yard like LineBay\n    spare for: LineBay\n{lines}"))
        };
        let finding = spare("    rated continuous current: 2000 A\n").one("spare-envelope");
        assert_eq!((finding.kind, finding.edits[0].text.as_str()), (FindingKind::Remark, "2500 A"));
        spare("").silent("spare-envelope");
        spare("    rated continuous current: 3150 A\n").silent("spare-envelope");
        Bay::new().silent("spare-envelope");
    }

    #[test]
    fn a_line_bay_copied_to_a_reactor() {
        let bay = Bay::new().set("circuit", "kind", "shunt reactor");
        let finding = bay.one("copied-bay");
        assert_eq!(finding.kind, FindingKind::Caution);
        assert!(finding.message.contains("short-line fault"), "{}", finding.message);
        // One such line proves nothing.
        bay.clone()
            .set("breaker", "rated operating sequence", "O - 3 min - CO - 3 min - CO")
            .without("breaker", "short-line fault")
            .without("breaker", "rated line-charging breaking current")
            .silent("copied-bay");
        Bay::new().set("circuit", "kind", "cable").silent("copied-bay");
        Bay::new().silent("copied-bay");
    }

    #[test]
    fn a_breaker_on_the_wrong_system() {
        let low = Bay::new().set("breaker", "rated voltage", "12 kV");
        let far = low.one("system-mismatch");
        assert_eq!(far.kind, FindingKind::Contradiction);
        low.silent("rated-voltage-below-system");
        let other = "system Low\n    nominal voltage: 10 kV\n    highest voltage: 12 kV\n";
        assert_eq!(low.and(other).one("system-mismatch").edits[0].text, "on Low");
        // One level beside is a matter of the rated voltage, unless another system fits it.
        let beside = Bay::new().set("breaker", "rated voltage", "123 kV");
        beside.silent("system-mismatch");
        beside.one("rated-voltage-below-system");
        let fitting = beside.and("system Other\n    highest voltage: 123 kV\n");
        fitting.one("system-mismatch");
        fitting.silent("rated-voltage-below-system");
        Bay::new().set("breaker", "rated voltage", "245 kV").silent("system-mismatch");
    }

    #[test]
    fn a_split_bus_wants_an_interlock() {
        let split = Bay::new().set("system", "level valid with", "bus section open");
        assert_eq!(split.one("split-bus").kind, FindingKind::Caution);
        split.clone().set("system", "interlocked", "no").one("split-bus");
        split.set("system", "interlocked", "yes").silent("split-bus");
        Bay::new().silent("split-bus");
    }
}
