//! Whether what a system states agrees with what follows from its infeeds.

use super::Fed;
use crate::duty::{FromInfeeds, Off};
use crate::finding::{Datum, Finding, FindingKind, Findings};
use crate::particular::system;
use crate::physics::short_circuit;
use crate::quantity::{ElectricCurrent, ElectricPotential, Physical, Power, Ratio, Time, significant};
use crate::rules::dc_component::NETWORK_CONSTANTS_DISAGREE;
use crate::rules::short_circuit::FAULT_LEVEL_DISAGREES;
use crate::rules::{EQUAL, Policy};
use crate::sheet::Statement;
use crate::source::Place;

/// What the system states counts; where its infeeds say otherwise, that is told once, the level before its constants.
pub(super) fn check(fed: &Fed<'_>, policy: &Policy, findings: &mut Findings) {
    if fed.infeeds.seen.is_none() {
        return;
    }
    let from = FromInfeeds::of(&fed.infeeds, None);
    let first = fed.infeeds.places().next();
    if !level_agrees(fed, &from, policy, first, findings) {
        return;
    }
    time_constant_agrees(fed, &from, policy, first, findings);
    earthing_agrees(fed, &from, policy, first, findings);
}

fn rests_on(finding: &mut Finding, fed: &Fed<'_>, first: Option<Place>) {
    if let Some(first) = first {
        finding.related(first, format!("the first of {} infeeds", fed.infeeds.parts.len()));
    }
}

/// A current as it is stated: in amperes, or as a fault level with its voltage.
fn stated_level<'a>(fed: &'a Fed<'_>) -> Option<(ElectricCurrent, &'a Statement)> {
    if let Some(current) = fed.facts.quantity::<ElectricCurrent>(&system::SHORT_CIRCUIT_CURRENT) {
        return Some((current.value, current.statement));
    }
    let level = fed.facts.quantity::<Power>(&system::FAULT_LEVEL)?;
    let voltage = level.statement.quantity()?.at?.to::<ElectricPotential>()?;
    Some((short_circuit::current_of_fault_level(level.value, voltage), level.statement))
}

fn level_agrees(
    fed: &Fed<'_>,
    from: &FromInfeeds,
    policy: &Policy,
    first: Option<Place>,
    findings: &mut Findings,
) -> bool {
    let one = fed.facts.quantity::<ElectricCurrent>(&system::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT);
    let pairs = [
        ("three-phase", stated_level(fed), from.three_phase.as_ref()),
        ("single-phase", one.map(|s| (s.value, s.statement)), from.single_phase.as_ref()),
    ];
    for (name, stated, figure) in pairs {
        let (Some((stated, statement)), Some(figure)) = (stated, figure) else { continue };
        let apart = (stated.si() - figure.value.si()) / figure.value.si();
        if !apart.is_finite() || apart.abs() <= policy.fault_level_tolerance + EQUAL {
            continue;
        }
        let message = format!(
            "{} is stated as the {name} short-circuit current of {}, and its infeeds give {}",
            stated.show(),
            fed.sheet.title(),
            figure.value.show()
        );
        let finding = findings.add(&FAULT_LEVEL_DISAGREES, statement.value, message);
        // A level for a later year, or one of a state with fewer sources, may well differ.
        let state = fed.facts.word(&system::LEVEL_VALID_WITH).map(|(word, _)| word);
        let another_state = state.is_some_and(|word| word != "all sources in service");
        if apart > 0.0 || another_state {
            finding.kind(FindingKind::Caution);
        }
        finding
            .label("does not agree with the infeeds")
            .stated(Datum::of(stated))
            .needed(Datum::of(figure.value))
            .working(figure.working.to_string())
            .advice("checks go by the stated value; correct it or the infeeds, or leave the value out");
        rests_on(finding, fed, first);
        return false;
    }
    true
}

fn time_constant_agrees(
    fed: &Fed<'_>,
    from: &FromInfeeds,
    policy: &Policy,
    first: Option<Place>,
    findings: &mut Findings,
) {
    // Of R/X at the point, as whoever states one value reckons it; by the slower branches it may be longer.
    let (Some(ratio), Some(frequency), false) =
        (from.r_over_x.as_ref(), fed.frequency, fed.infeeds.is_off(Off::DirectCurrent))
    else {
        return;
    };
    if ratio.value.value <= 0.0 {
        return;
    }
    let of_infeeds = short_circuit::time_constant(ratio.value.value.recip(), frequency);
    let tau = fed.facts.quantity::<Time>(&system::DC_TIME_CONSTANT).map(|s| (s.value, s.statement));
    let of_x = || {
        let stated = fed.facts.quantity::<Ratio>(&system::X_OVER_R)?;
        Some((short_circuit::time_constant(stated.value.value, frequency), stated.statement))
    };
    let Some((stated, statement)) = tau.or_else(of_x) else { return };
    // A longer one than the infeeds' is on the safe side.
    if stated.si() >= of_infeeds.si() * (1.0 - policy.infeed_constant_tolerance) {
        return;
    }
    let message = format!(
        "a time constant of {} is stated for {}, and its infeeds give {}",
        stated.show(),
        fed.sheet.title(),
        of_infeeds.show()
    );
    let finding = findings.add(&NETWORK_CONSTANTS_DISAGREE, statement.value, message);
    finding
        .label("shorter than that of the infeeds")
        .stated(Datum::of(stated))
        .needed(Datum::of(of_infeeds))
        .working(ratio.working.to_string())
        .working(format!("tau = 1/(2 pi f R/X), f = {}: {}", frequency.show(), of_infeeds.show()))
        .advice("checks go by the stated value; correct it or the infeeds, or leave the value out");
    rests_on(finding, fed, first);
}

fn earthing_agrees(fed: &Fed<'_>, from: &FromInfeeds, policy: &Policy, first: Option<Place>, findings: &mut Findings) {
    let ratio = fed.facts.quantity::<Ratio>(&system::X0_OVER_X1);
    let known = from.x0_over_x1.as_ref();
    if let (Some(stated), Some(figure)) = (&ratio, known) {
        if figure.value.value <= stated.value.value * (1.0 + policy.infeed_constant_tolerance) {
            return;
        }
        let text = significant(figure.value.value, 3);
        let message = format!(
            "X0/X1 of at most {} is stated for {}, and its infeeds give {text}",
            significant(stated.value.value, 3),
            fed.sheet.title()
        );
        let finding = findings.add(&NETWORK_CONSTANTS_DISAGREE, stated.place(), message);
        finding.label("less than the infeeds give").needed(text).working(figure.working.to_string());
        rests_on(finding, fed, first);
        return;
    }
    let Some((word @ ("solidly earthed" | "effectively earthed"), statement)) = fed.facts.word(&system::NEUTRAL) else {
        return;
    };
    if ratio.is_some() || from.effectively_earthed() != Some(false) {
        return;
    }
    let found = match (known, from.r0_over_x1) {
        (Some(x0), Some(r0)) => format!("X0/X1 {} and R0/X1 {}", significant(x0.value.value, 3), significant(r0, 3)),
        _ => "no earthed neutral at all".to_owned(),
    };
    let message = format!("the neutral of {} is stated as {word}, and its infeeds give {found}", fed.sheet.title());
    let finding = findings.add(&NETWORK_CONSTANTS_DISAGREE, statement.value, message);
    finding.label("not by the infeeds").stated(word).advice(
        "effectively earthed means X0/X1 of at most 3 and R0/X1 of at most 1: correct the neutral of the system or of the infeeds",
    );
    if let Some(known) = known {
        finding.working(known.working.to_string());
    }
    rests_on(finding, fed, first);
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const GRID: &str = "    short-circuit current: 28.4 kA\n    X/R: 13\n    X0/X1: 2.6\n    R0/X0: 0.1\n    nominal voltage: 132 kV\n";

    /// The clean bay with a stated level, and a network of 28.4 kA.
    fn both(stated: &str) -> Bay {
        Bay::new()
            .set("system", "short-circuit current", stated)
            .without("system", "single-phase short-circuit current")
            .and(&format!("infeed Grid into Ring\n    kind: network\n{GRID}"))
    }

    #[test]
    fn a_stated_level_is_held_against_the_infeeds() {
        both("28.4 kA").silent("fault-level-disagrees");
        both("29.8 kA").silent("fault-level-disagrees");
        let more = both("30 kA").one("fault-level-disagrees");
        assert_eq!(more.kind, FindingKind::Caution);
        let less = both("26.5 kA").one("fault-level-disagrees");
        assert_eq!(less.kind, FindingKind::Contradiction);
        assert!(less.message.contains("28.4 kA"), "{}", less.message);
        both("27 kA").silent("fault-level-disagrees");
        // Fewer sources than all are in service on purpose.
        let reduced = both("26.5 kA").set("system", "level valid with", "reduced infeed");
        assert_eq!(reduced.one("fault-level-disagrees").kind, FindingKind::Caution);
    }

    /// X/R 13 at 50 Hz is 41.4 ms.
    #[test]
    fn stated_constants_are_held_against_the_infeeds() {
        let rule = "network-constants-disagree";
        both("28.4 kA").silent(rule);
        both("28.4 kA").set("system", "DC time constant", "36 ms").one(rule);
        both("28.4 kA").set("system", "DC time constant", "38 ms").silent(rule);
        both("28.4 kA").set("system", "DC time constant", "60 ms").silent(rule);
        both("28.4 kA").set("system", "X0/X1", "2.2").one(rule);
        both("28.4 kA").set("system", "X0/X1", "2.4").silent(rule);
        let by_word = |ratio: &str| {
            let grid = GRID.replace("X0/X1: 2.6", &format!("X0/X1: {ratio}"));
            let bay = Bay::new().without("system", "X0/X1").without("system", "single-phase short-circuit current");
            bay.and(&format!("infeed Grid into Ring\n    kind: network\n{grid}"))
        };
        assert!(by_word("3.1").one(rule).message.contains("effectively earthed"));
        by_word("3.0").silent(rule);
        // One finding for one cause: where the level is another, its constants are not told as well.
        both("26.5 kA").set("system", "DC time constant", "36 ms").silent(rule);
    }
}
