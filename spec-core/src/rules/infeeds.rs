//! Rules on the infeeds of a system: what they lack, and whether what the system states agrees with them.

mod agreement;

use super::{Check, Policy, Rule};
use crate::duty::{Infeeds, Off};
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{Particular, SheetKind, breaker, system};
use crate::quantity::{Frequency, Physical};
use crate::sheet::{Facts, Set, Sheet};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&INFEED_INCOMPLETE, &INFEED_MISPLACED];

/// A system with its infeeds, where a breaker stands on it.
struct Fed<'a> {
    sheet: &'a Sheet,
    facts: &'a Facts,
    infeeds: Infeeds,
    frequency: Option<Frequency>,
}

/// The system of a sheet, where it has infeeds and a breaker stands on it.
fn fed_system<'a>(set: &'a Set, sheet: &'a Sheet) -> Option<Fed<'a>> {
    if sheet.kind != SheetKind::System {
        return None;
    }
    set.pointing_at(sheet.id, "into").next()?;
    let breakers = set.pointing_at(sheet.id, "on").filter(|other| other.kind == SheetKind::Breaker);
    let breakers: Vec<&Facts> = breakers.map(|breaker| set.facts(breaker.id)).collect();
    breakers.first()?;
    let facts = set.facts(sheet.id);
    let rated = || breakers.iter().find_map(|b| b.quantity::<Frequency>(&breaker::RATED_FREQUENCY));
    let frequency = facts.quantity(&system::FREQUENCY).or_else(rated).map(|stated| stated.value);
    Some(Fed { sheet, facts, infeeds: Infeeds::of(set, sheet.id, frequency), frequency })
}

impl Fed<'_> {
    fn mentions(&self, particulars: &[&Particular]) -> bool {
        particulars.iter().any(|particular| self.facts.mentions(particular))
    }

    fn has_level(&self) -> bool {
        self.mentions(&[&system::SHORT_CIRCUIT_CURRENT, &system::FAULT_LEVEL])
    }

    /// Whether anything hangs on a datum that is off.
    fn matters(&self, off: Off) -> bool {
        match off {
            Off::Everything => true,
            Off::DirectCurrent => !self.mentions(&[
                &system::DC_TIME_CONSTANT,
                &system::X_OVER_R,
                &system::R_OVER_X,
                &system::PEAK_SHORT_CIRCUIT_CURRENT,
            ]),
            Off::Earth => {
                let word = self.facts.word(&system::NEUTRAL).map(|(word, _)| word);
                let earthed = word.is_none_or(|word| matches!(word, "solidly earthed" | "effectively earthed"));
                earthed && !self.facts.mentions(&system::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT)
            }
            Off::RecoveryVoltage => {
                !self.mentions(&[&system::PROSPECTIVE_TRV_PEAK, &system::PROSPECTIVE_TRV_RATE_OF_RISE])
            }
        }
    }
}

/// The infeeds of a system say enough.
pub static INFEED_INCOMPLETE: Rule = Rule {
    name: "infeed-incomplete",
    title: "The infeeds of a system say what its short-circuit currents need.",
    kind: FindingKind::Omission,
    basis: "IEC 60909-0, IEEE C37.011 (from memory)",
    formula: "Ik'' = c Un/(sqrt3 |Z1|): magnitude and angle of every impedance; Z0 for faults to earth",
    explanation: "One infeed without its data leaves the sum unknown, and nothing is guessed. Names what to write in which infeed and \
                  which checks are off until then. A remark where the system states its level, since then only the comparison is \
                  off. Silent about the zero sequence where the neutral is not effectively earthed or the single-phase current is \
                  stated, about the armature resistance where the system states a time constant, and about surge impedances where \
                  no line has one.",
    check: Check::Sheet(incomplete),
};

fn incomplete(set: &Set, sheet: &Sheet, policy: &Policy, findings: &mut Findings) {
    if let Some(fed) = fed_system(set, sheet) {
        missing_data(&fed, findings);
        agreement::check(&fed, policy, findings);
    }
}

/// What is off without it, after `... of system Ring`.
fn consequence(off: Off, stated: bool) -> &'static str {
    match off {
        Off::Everything if stated => "does not follow from its infeeds, and cannot be compared with the stated one",
        Off::Everything => {
            "does not follow from its infeeds, and the checks of breaking, making, DC component, heat and TRV are off"
        }
        Off::DirectCurrent => "does not follow from its infeeds, and the checks of the DC component are off",
        Off::Earth => {
            "do not follow from its infeeds, and the checks of the single-phase current and of the first-pole-to-clear factor are off"
        }
        Off::RecoveryVoltage => "does not follow from its infeeds, and is not held against the envelope",
    }
}

const fn subject(off: Off) -> &'static str {
    match off {
        Off::Everything => "the short-circuit current",
        Off::DirectCurrent => "the time constant",
        Off::Earth => "faults to earth",
        Off::RecoveryVoltage => "the recovery voltage",
    }
}

fn missing_data(fed: &Fed<'_>, findings: &mut Findings) {
    let lacking: Vec<_> = fed.infeeds.lacking.iter().filter(|lacking| fed.matters(lacking.off)).collect();
    // The gravest first: without a current nothing else follows either.
    let Some(gravest) = lacking.iter().map(|lacking| lacking.off).min() else { return };
    let stated = fed.has_level();
    let of_gravest: Vec<_> = lacking.iter().filter(|lacking| lacking.off == gravest).collect();
    let lacks: Vec<String> = of_gravest.iter().map(|l| format!("{} lacks {}", l.title, joined(&l.what))).collect();
    let message =
        format!("{}: {} of {} {}", lacks.join("; "), subject(gravest), fed.sheet.title(), consequence(gravest, stated));
    let Some(first) = of_gravest.first() else { return };
    let finding = findings.add(&INFEED_INCOMPLETE, first.place, message);
    if stated && gravest == Off::Everything {
        finding.kind(FindingKind::Remark);
    }
    finding.label("says too little");
    for other in lacking.iter().filter(|other| other.place != first.place) {
        finding.related(other.place, format!("lacks {}", joined(&other.what)));
    }
    finding.related(fed.sheet.heading, "the system that it feeds");
    let all: Vec<String> = lacking.iter().map(|l| format!("to {}: {}", l.title, joined(&l.what))).collect();
    let advice = format!("add {}", all.join("; "));
    finding.advice(if stated { advice } else { format!("{advice}; or state the short-circuit current of the system") });
}

fn joined(what: &[String]) -> String {
    match what {
        [] => String::new(),
        [only] => only.clone(),
        [most @ .., last] => format!("{} and {last}", most.join(", ")),
    }
}

/// An infeed stands at its own voltage.
pub static INFEED_MISPLACED: Rule = Rule {
    name: "infeed-misplaced",
    title: "An infeed stands at a place of its own voltage.",
    kind: FindingKind::Contradiction,
    basis: "common practice, no source: nominal and rated voltages of one level lie within a quarter of each other",
    formula: "a side of the transformer, or the voltage of the source, within 25 % of the voltage where it stands",
    explanation: "A transformer whose sides are 110 and 10 kV cannot feed a system of 33 kV, and a generator of 10.5 kV cannot stand at \
                  132 kV without its transformer. The currents do not follow from such infeeds. Correct the voltage, or lead the \
                  source through the element that is missing.",
    check: Check::Sheet(misplaced),
};

fn misplaced(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    if let Some(fed) = fed_system(set, sheet) {
        for one in &fed.infeeds.misplaced {
            let own: Vec<String> = one.own.iter().map(|voltage| voltage.show()).collect();
            let message = format!(
                "{} has {}, and stands at {} of {}",
                one.title,
                joined(&own),
                one.there.show(),
                fed.sheet.title()
            );
            findings
                .add(&INFEED_MISPLACED, one.place, message)
                .label("another voltage")
                .needed(Datum::of(one.there))
                .related(fed.sheet.heading, "the system that it feeds")
                .advice("correct the voltage, or lead it through the transformer that is missing");
        }
    }
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    /// The clean bay without a stated level, fed by one network of 28.4 kA.
    fn fed(grid: &str) -> Bay {
        let bay = ["short-circuit current", "single-phase short-circuit current", "DC time constant", "X0/X1"]
            .into_iter()
            .fold(Bay::new(), |bay, label| bay.without("system", label));
        bay.and(&format!("infeed Grid into Ring\n    kind: network\n{grid}"))
    }

    const GRID: &str = "    short-circuit current: 28.4 kA\n    X/R: 13\n    X0/X1: 2.6\n    R0/X0: 0.1\n    nominal voltage: 132 kV\n";

    #[test]
    fn infeeds_take_the_place_of_a_stated_level() {
        let found: Vec<_> = fed(GRID).findings().into_iter().filter(|f| f.kind < FindingKind::Excess).collect();
        assert!(found.is_empty(), "{found:#?}");
        for rule in [
            "duty-missing",
            "fault-level-basis",
            "dc-time-constant-missing",
            "single-phase-level-missing",
            "neutral-not-stated",
        ] {
            fed(GRID).silent(rule);
            fed(GRID).without("system", "neutral").silent(rule);
        }
    }

    /// Checks go by what follows from the infeeds: currents, peak, time constant, heat, earthing.
    #[test]
    fn every_rule_reads_the_duty_of_the_infeeds() {
        let finding = fed(&GRID.replace("28.4", "33")).one("breaking-current-below-duty");
        assert!(
            finding.working[0].contains("of Grid") && finding.related[0].message.contains("1 infeeds"),
            "{finding:#?}"
        );
        fed(&GRID.replace("28.4", "31.5")).silent("breaking-current-below-duty");
        fed(&GRID.replace("X/R: 13", "X/R: 21")).one("dc-time-constant");
        fed(&GRID.replace("X/R: 13", "X/R: 14.1")).silent("dc-time-constant");
        fed(&GRID.replace("X/R: 13", "X/R: 21").replace("28.4", "31")).one("making-current-below-duty");
        fed(GRID).set("system", "backup clearing time", "1.4 s").one("thermal-duty");
        // An unearthed network asks for 1.5, where nothing is said of the neutral.
        let isolated = "    short-circuit current: 28.4 kA\n    X/R: 13\n    neutral: isolated\n";
        fed(isolated).without("system", "neutral").one("first-pole-factor");
        // kpp is 1.30 at X0/X1 3.2 and 1.31 at 3.4.
        fed(&GRID.replace("X0/X1: 2.6", "X0/X1: 3.2")).silent("first-pole-factor");
        fed(&GRID.replace("X0/X1: 2.6", "X0/X1: 3.5")).one("first-pole-factor");
    }

    #[test]
    fn growth_is_of_stated_levels_only() {
        fed(GRID).set("system", "growth of short-circuit current", "0.5 %/year").silent("breaking-current-below-duty");
    }

    #[test]
    fn one_omission_says_what_to_write() {
        let bay = fed("    short-circuit current: 28.4 kA\n    X0/X1: 2.6\n    R0/X0: 0.1\n").and(
            "infeed T into Ring\n    kind: transformer\n    rated power: 100 MVA\n    high-voltage side: 230 kV\n    low-voltage side: 138 kV\n    \
             impedance voltage: 12 %\ninfeed Upper into Ring through T\n    kind: network\n    fault level: 9 GVA\n    X/R: 12\n",
        );
        let finding = bay.one("infeed-incomplete");
        assert_eq!(finding.kind, FindingKind::Omission);
        for text in [
            "infeed Grid lacks X/R",
            "infeed T lacks load losses",
            "infeed Upper lacks nominal voltage",
            "checks of breaking",
        ] {
            assert!(finding.message.contains(text), "{text}: {}", finding.message);
        }
        bay.silent("duty-missing");
        // A value that cannot be read is not called missing, and nothing is reckoned without it.
        let unread = fed(&GRID.replace("X/R: 13", "X/R: thirteen"));
        unread.silent("infeed-incomplete");
        unread.silent("duty-missing");
        // With a stated level only the comparison is off.
        let stated = Bay::new().and("infeed Grid into Ring\n    kind: network\n    short-circuit current: 28.4 kA\n");
        assert_eq!(stated.one("infeed-incomplete").kind, FindingKind::Remark);
        fed(GRID).silent("infeed-incomplete");
    }

    #[test]
    fn the_zero_sequence_is_asked_for_where_it_counts() {
        let grid = GRID.replace("    R0/X0: 0.1\n", "");
        let finding = fed(&grid).one("infeed-incomplete");
        assert!(
            finding.message.contains("R0/X0") && finding.message.contains("faults to earth"),
            "{}",
            finding.message
        );
        fed(&grid).set("system", "neutral", "isolated").silent("infeed-incomplete");
        fed(&grid).set("system", "single-phase short-circuit current", "24 kA").silent("infeed-incomplete");
        fed(&grid).without("system", "neutral").one("infeed-incomplete");
        // Behind a delta winding nothing has to be known of it; between two earthed stars all of it.
        let behind = |connection: &str, more: &str| {
            let transformer = format!(
                "infeed T into Ring\n    kind: transformer\n    rated power: 300 MVA\n    high-voltage side: 230 kV\n    low-voltage side: 138 kV\n    \
                 impedance voltage: 12 %\n    load losses: 600 kW\n    winding connection: {connection}\n    neutral: solidly earthed\n{more}"
            );
            let upper =
                "infeed Upper into Ring through T\n    kind: network\n    fault level: 9 GVA at 220 kV\n    X/R: 12\n";
            fed(GRID).and(&transformer).and(upper)
        };
        behind("Dyn5", "").silent("infeed-incomplete");
        behind("Yyn0", "").silent("infeed-incomplete");
        let stars = behind("YNyn0", "    neutral of the far side: solidly earthed\n").one("infeed-incomplete");
        assert!(stars.message.contains("infeed Upper lacks X0/X1 and R0/X0"), "{}", stars.message);
        let unsaid = behind("YNyn0", "").one("infeed-incomplete");
        assert!(unsaid.message.contains("neutral of the far side"), "{}", unsaid.message);
    }

    #[test]
    fn a_generator_without_its_resistance_has_no_time_constant() {
        let machine = "infeed G into Ring through T\n    kind: generator\n    rated power: 100 MVA\n    rated voltage: 10.5 kV\n    \
                       subtransient reactance: 16 %\n    power factor: 0.9\ninfeed T into Ring\n    kind: transformer\n    rated power: 100 MVA\n    \
                       high-voltage side: 138 kV\n    low-voltage side: 10.5 kV\n    impedance voltage: 12 %\n    load losses: 500 kW\n    \
                       on-load tap range: 10 %\n    winding connection: Yd5\n";
        let finding = fed(GRID).and(machine).one("infeed-incomplete");
        assert!(finding.message.contains("infeed G lacks armature resistance"), "{}", finding.message);
        fed(GRID).and(machine).set("system", "DC time constant", "42 ms").silent("infeed-incomplete");
        let known = machine.replace("power factor", "armature resistance: 0.2 %\n    power factor");
        fed(GRID).and(&known).silent("infeed-incomplete");
        // Without a word on the tap changer no correction factor can be chosen.
        let untold = known.replace("    on-load tap range: 10 %\n", "");
        assert!(fed(GRID).and(&untold).one("infeed-incomplete").message.contains("on-load tap range"));
    }

    #[test]
    fn circles_of_systems_end() {
        let upper = "system Upper\n    nominal voltage: 220 kV\ninfeed Back into Upper from Ring\n    kind: transformer\n    rated power: 100 MVA\n    \
                     high-voltage side: 230 kV\n    low-voltage side: 138 kV\n    impedance voltage: 12 %\n    load losses: 300 kW\n";
        let forth = "infeed Forth into Ring from Upper\n    kind: transformer\n    rated power: 100 MVA\n    high-voltage side: 230 kV\n    \
                     low-voltage side: 138 kV\n    impedance voltage: 12 %\n    load losses: 300 kW\n    winding connection: Dyn5\n    neutral: solidly earthed\n";
        let bay = fed(GRID).heading("breaker", "breaker LineBay on Ring at Yard").and(upper).and(forth);
        let finding = bay.one("infeed-incomplete");
        assert!(finding.message.contains("not fed by this system again"), "{}", finding.message);
        let ends = bay.and("").findings();
        assert!(!ends.is_empty());
        let stated = upper.replace(
            "220 kV\n",
            "220 kV\n    short-circuit current: 20 kA\n    X/R: 12\n    single-phase short-circuit current: 18 kA\n",
        );
        fed(GRID).and(&stated).and(forth).silent("infeed-incomplete");
    }

    #[test]
    fn infeeds_stand_at_their_own_voltage() {
        let at = |kv: &str| fed(&GRID.replace("132 kV", kv));
        let finding = at("33 kV").one("infeed-misplaced");
        assert_eq!(finding.kind, FindingKind::Contradiction);
        at("33 kV").silent("infeed-incomplete");
        at("33 kV").silent("duty-missing");
        at("110 kV").silent("infeed-misplaced");
        at("105 kV").one("infeed-misplaced");
        let sides = "infeed T into Ring from Grid\n    kind: transformer\n    rated power: 100 MVA\n    high-voltage side: 66 kV\n    low-voltage side: 11 kV\n    \
                     impedance voltage: 12 %\n    load losses: 300 kW\n    winding connection: Dd0\n";
        fed(GRID).and(sides).one("infeed-misplaced");
        at("132 kV").silent("infeed-misplaced");
    }

    /// A feeder at the system gives its own current back, whatever the voltage factor of the system is; one with another factor of its
    /// own, 1.1 where the system has 1.0, gives 9 % less.
    #[test]
    fn the_voltage_factor_of_the_system() {
        let lower = |grid: &str| {
            fed(grid).set("system", "voltage factor", "1.0").set("system", "short-circuit current", "28.4 kA")
        };
        lower(GRID).silent("fault-level-disagrees");
        let finding = lower(&format!("{GRID}    voltage factor: 1.1\n")).one("fault-level-disagrees");
        assert!(finding.message.contains("25.8 kA"), "{}", finding.message);
    }

    /// What is left to the duty is chosen by the infeeds: 28.4 kA at 41.4 ms.
    #[test]
    fn ratings_are_chosen_by_the_infeeds() {
        let bay = fed(GRID)
            .set("breaker", "rated short-circuit breaking current", "from duty")
            .set("breaker", "DC time constant", "from duty")
            .set("breaker", "rated short-circuit making current", "from duty")
            .set("breaker", "first-pole-to-clear factor", "from duty");
        let grave: Vec<_> = bay.findings().into_iter().filter(|f| f.kind < FindingKind::Excess).collect();
        assert!(grave.is_empty(), "{grave:#?}");
    }

    /// Any text ends: a thousand infeeds, and systems that feed each other twice in thirty steps.
    #[test]
    fn more_infeeds_than_a_network_has() {
        let many: Vec<String> =
            (0..1000).map(|n| format!("infeed N{n} into Ring\n    kind: network\n    short-circuit current: 1 kA\n    X/R: 9\n    neutral: isolated\n")).collect();
        let finding = fed(GRID).and(&many.concat()).one("infeed-incomplete");
        assert!(finding.message.contains("300 infeeds"), "{}", finding.message);
        let transformer = "    kind: transformer\n    rated power: 100 MVA\n    high-voltage side: 132 kV\n    low-voltage side: 132 kV\n    \
                           impedance voltage: 12 %\n    load losses: 300 kW\n    winding connection: Dd0\n";
        let doubled: Vec<String> = (0..30)
            .map(|n| {
                let above = n + 1;
                format!(
                    "system S{n}\n    nominal voltage: 132 kV\ninfeed A{n} into S{n} from S{above}\n{transformer}infeed B{n} into S{n} from S{above}\n{transformer}"
                )
            })
            .collect();
        let bay = fed(GRID)
            .and(&doubled.concat())
            .and("system S30\n    nominal voltage: 132 kV\n")
            .and(&format!("infeed T into Ring from S0\n{transformer}"));
        bay.one("infeed-incomplete");
    }
}
