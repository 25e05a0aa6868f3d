//! Rules on the breaking current and the fault level.

use super::{Check, EQUAL, Rule, breaking_current, rests_on_infeeds};
use crate::case::Case;
use crate::duty::percent;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{system, tender};
use crate::physics::short_circuit;
use crate::quantity::{ElectricCurrent, ElectricPotential, Physical, Power, Ratio, Time};
use crate::sheet::Stated;
use crate::standards::{PreferredCurrents, RatingSeries};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &BREAKING_CURRENT_BELOW_DUTY,
    &DECAYED_CURRENT_BASIS,
    &SHORT_CIRCUIT_MARGIN,
    &BREAKING_CURRENT_NOT_PREFERRED,
    &FAULT_LEVEL_DISAGREES,
];

fn series(case: &Case<'_>) -> PreferredCurrents {
    PreferredCurrents::of(RatingSeries::Breaking, &case.regimes().families())
}

/// The breaking current is not below the duty.
pub static BREAKING_CURRENT_BELOW_DUTY: Rule = Rule {
    name: "breaking-current-below-duty",
    title: "The rated short-circuit breaking current is not below the short-circuit current where the breaker stands.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-100:2021 5.101, IEEE C37.010 (from memory)",
    formula: "Isc >= max(Ik3'', Ik1'', Ik2E''), or the documented share of the breaker",
    explanation: "The largest initial symmetrical current counts, at the end of the service life where growth is stated. Where the \
                  share that flows through the breaker is documented, that is compared. Where only the current decayed at contact \
                  separation fits, decayed-current-basis speaks instead.",
    check: Check::Case(below_duty),
};

/// The current at contact separation, where it is stated with its time and is what the rating covers.
pub(super) fn decayed<'a>(case: &'a Case<'_>) -> Option<(Stated<'a, ElectricCurrent>, Stated<'a, Time>)> {
    let current = case.system.quantity(&system::SYMMETRICAL_SHORT_CIRCUIT_BREAKING_CURRENT)?;
    let delay = case.system.quantity(&system::MINIMUM_TIME_DELAY)?;
    Some((current, delay))
}

fn below_duty(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(duty)) = (breaking_current(case), case.duty.breaking_duty.as_ref()) else { return };
    if rated.value.si() >= duty.value.si() * (1.0 - EQUAL) {
        return;
    }
    if decayed(case).is_some_and(|(current, _)| current.value.si() <= rated.value.si() * (1.0 + EQUAL)) {
        return;
    }
    let needed = series(case).at_or_above(duty.value);
    let message = format!(
        "the rated short-circuit breaking current {} is below the duty, {}",
        rated.measure,
        rated.like(duty.value)
    );
    let finding = findings.add(&BREAKING_CURRENT_BELOW_DUTY, rated.place(), message);
    finding.label("below the duty").stated(&rated.measure);
    // How the current itself came about: from a fault level, or with growth.
    if let Some(initial) = case.duty.short_circuit_current.as_ref().filter(|f| f.working.inputs.len() > 1) {
        finding.working(initial.working.to_string());
    }
    finding.working(duty.working.to_string());
    for place in duty.places() {
        finding.related(place, "a fault current of the system");
    }
    rests_on_infeeds(finding, duty);
    // Who relies on the decay states it with its time.
    if let Some(decayed) = case.duty.infeeds.breaking.as_ref().filter(|_| !duty.working.infeeds.is_empty()) {
        finding.working(decayed.working.to_string());
    }
    if let Some(needed) = needed {
        let text = rated.like(needed);
        finding.needed(Datum { text: text.clone(), si: Some(needed.si()) }).replace_by(text);
        finding.advice(
            "making current, short-time and peak withstand current and the out-of-phase current follow from it",
        );
    }
}

/// Which current a rating rests on is said where it is the decayed one.
pub static DECAYED_CURRENT_BASIS: Rule = Rule {
    name: "decayed-current-basis",
    title: "A rating that covers only the current decayed at contact separation says so.",
    kind: FindingKind::Caution,
    basis: "IEC 60909-0 (from memory)",
    formula: "Ib(tmin) <= Isc < Ik''",
    explanation: "The initial current governs unless the buyer relies on its decay. Where the decayed current is stated with its \
                  time delay and only that fits the rating, both numbers are named, so that a reviewer can accept the delay.",
    check: Check::Case(decayed_basis),
};

fn decayed_basis(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(duty), Some((current, delay))) =
        (breaking_current(case), case.duty.breaking_duty.as_ref(), decayed(case))
    else {
        return;
    };
    let fits = current.value.si() <= rated.value.si() * (1.0 + EQUAL);
    if !fits || rated.value.si() >= duty.value.si() * (1.0 - EQUAL) {
        return;
    }
    let message = format!(
        "{} at {} fits the rated {}, the initial current {} does not: state the delay that is relied on",
        current.measure,
        delay.measure,
        rated.measure,
        rated.like(duty.value)
    );
    findings
        .add(&DECAYED_CURRENT_BASIS, rated.place(), message)
        .label("covers the decayed current only")
        .stated(&rated.measure)
        .needed(Datum { text: rated.like(duty.value), si: Some(duty.value.si()) })
        .working(duty.working.to_string())
        .beside(current.statement, "the decayed current")
        .beside(delay.statement, "its delay");
}

/// The reserve that the tender's own policy asks for is there.
pub static SHORT_CIRCUIT_MARGIN: Rule = Rule {
    name: "short-circuit-margin",
    title: "The reserve between duty and rated breaking current is what the buyer's policy asks for.",
    kind: FindingKind::Caution,
    basis: "the buyer's policy, as the tender states it",
    formula: "(Isc - Ik'')/Isc >= margin",
    explanation: "Only where the tender states a short-circuit margin. A rating below the duty is a shortfall of its own and is not \
                  told again.",
    check: Check::Case(margin),
};

fn margin(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(duty), Some(policy)) = (
        breaking_current(case),
        case.duty.breaking_duty.as_ref(),
        case.tender.quantity::<Ratio>(&tender::SHORT_CIRCUIT_MARGIN),
    ) else {
        return;
    };
    let reserve = 1.0 - duty.value.si() / rated.value.si();
    if reserve < 0.0 || reserve >= policy.value.value - EQUAL {
        return;
    }
    let needed = ElectricCurrent::from_si(duty.value.si() / (1.0 - policy.value.value));
    let message = format!(
        "the reserve of {} over {} is {}, and the tender asks for {}",
        rated.measure,
        rated.like(duty.value),
        percent(reserve),
        policy.measure
    );
    let finding = findings.add(&SHORT_CIRCUIT_MARGIN, rated.place(), message);
    finding.label("less reserve than asked for").stated(percent(reserve)).needed(&policy.measure);
    finding.working(format!("(Isc - Ik'')/Isc = ({} - {})/{}", rated.measure, rated.like(duty.value), rated.measure));
    finding.beside(policy.statement, "the buyer's policy");
    if let Some(value) = series(case).at_or_above(needed) {
        finding.replace_by(rated.like(value));
    }
}

/// The breaking current is a preferred value.
pub static BREAKING_CURRENT_NOT_PREFERRED: Rule = Rule {
    name: "breaking-current-not-preferred",
    title: "The rated short-circuit breaking current is a value of the R10 series.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-100:2021 5.101, R10 series of IEC 60059 (from memory)",
    formula: "Isc in 6.3, 8, 10, 12.5, 16, 20, 25, 31.5, 40, 50, 63, 80, 100 kA",
    explanation: "A value off the series is usually a fault level written for a rating; no breaker is tested for it. Generator \
                  circuit-breakers are exempt, since theirs follow the machine.",
    check: Check::Case(not_preferred),
};

fn not_preferred(case: &Case<'_>, findings: &mut Findings) {
    let Some(rated) = breaking_current(case) else { return };
    let series = series(case);
    if series.has(rated.value) || case.is_generator_breaker() {
        return;
    }
    let message = format!("{} is a fault level, not a rating: it is no value of the series", rated.measure);
    let finding = findings.add(&BREAKING_CURRENT_NOT_PREFERRED, rated.place(), message);
    finding.label("not a preferred value").stated(&rated.measure);
    if let Some(needed) = series.at_or_above(rated.value) {
        let text = rated.like(needed);
        finding.needed(Datum { text: text.clone(), si: Some(needed.si()) }).replace_by(text);
    }
}

/// The fault level in MVA and the current in kA agree.
pub static FAULT_LEVEL_DISAGREES: Rule = Rule {
    name: "fault-level-disagrees",
    title: "The fault level in MVA and the short-circuit current in kA are the same.",
    kind: FindingKind::Contradiction,
    basis: "IEC 60909-0 (from memory)",
    formula: "Sk'' = sqrt3 U Ik''",
    explanation: "Round figures of the trade agree within 5 %. A fault level without its voltage is tried at the nominal, the \
                  highest and the rated voltage, and is accepted if it agrees at one of them.",
    check: Check::Case(fault_level),
};

fn fault_level(case: &Case<'_>, findings: &mut Findings) {
    let (Some(level), Some(current)) = (
        case.system.quantity::<Power>(&system::FAULT_LEVEL),
        case.system.quantity::<ElectricCurrent>(&system::SHORT_CIRCUIT_CURRENT),
    ) else {
        return;
    };
    let stated = level.statement.quantity().and_then(|q| q.at).and_then(|at| at.to::<ElectricPotential>());
    let others = [
        case.system.quantity::<ElectricPotential>(&system::NOMINAL_VOLTAGE).map(|s| s.value),
        case.system.quantity::<ElectricPotential>(&system::HIGHEST_VOLTAGE).map(|s| s.value),
        case.rated_voltage().map(|s| s.value),
    ];
    let voltages: Vec<ElectricPotential> = match stated {
        Some(voltage) => vec![voltage],
        None => others.into_iter().flatten().collect(),
    };
    let tolerance = case.policy.fault_level_tolerance;
    let apart = |u: &ElectricPotential| {
        let i = short_circuit::current_of_fault_level(level.value, *u);
        (i.si() - current.value.si()).abs() / current.value.si()
    };
    let Some(nearest) = voltages.iter().min_by(|a, b| apart(a).total_cmp(&apart(b))) else { return };
    if apart(nearest) <= tolerance {
        return;
    }
    let of_level = short_circuit::current_of_fault_level(level.value, *nearest);
    let message = format!(
        "{} at {} is {}, and {} is stated",
        level.measure,
        nearest.show(),
        current.like(of_level),
        current.measure
    );
    let right = short_circuit::fault_level_of_current(current.value, *nearest);
    findings
        .add(&FAULT_LEVEL_DISAGREES, level.place(), message)
        .label("does not agree with the current")
        .stated(&level.measure)
        .needed(Datum { text: level.like(right), si: Some(right.si()) })
        .working(format!(
            "Ik'' = S/(sqrt3 U) = {}/(1.732 x {}) = {}",
            level.measure,
            nearest.show(),
            current.like(of_level)
        ))
        .beside(current.statement, "the short-circuit current")
        .edit(
            format!("write {} at {}", level.like(right), nearest.show()),
            level.place(),
            format!("{} at {}", level.like(right), nearest.show()),
        );
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const ISC: &str = "rated short-circuit breaking current";

    #[test]
    fn the_largest_fault_current_counts() {
        let finding = Bay::new().set("system", "short-circuit current", "33 kA").one("breaking-current-below-duty");
        assert_eq!(finding.edits[0].text, "40 kA");
        Bay::new().silent("breaking-current-below-duty");
        Bay::new().set("system", "short-circuit current", "31.5 kA").silent("breaking-current-below-duty");
        let single =
            Bay::new().set("system", "single-phase short-circuit current", "32 kA").one("breaking-current-below-duty");
        assert!(single.message.contains("32 kA"), "{}", single.message);
    }

    #[test]
    fn a_fault_level_in_mva_is_a_current() {
        let bay = Bay::new()
            .without("system", "short-circuit current")
            .without("system", "single-phase short-circuit current");
        bay.clone().set("system", "fault level", "7.5 GVA at 132 kV").one("breaking-current-below-duty");
        bay.set("system", "fault level", "7000 MVA at 132 kV").silent("breaking-current-below-duty");
    }

    #[test]
    fn growth_is_counted_to_the_end_of_the_service_life() {
        let bay = Bay::new().set("system", "growth of short-circuit current", "0.5 %/year");
        let finding = bay.one("breaking-current-below-duty");
        assert!(finding.working[0].contains("growth"), "{:?}", finding.working);
        bay.set("tender", "service life", "10 years").silent("breaking-current-below-duty");
    }

    #[test]
    fn the_documented_share_of_the_breaker_is_what_it_breaks() {
        Bay::new()
            .set("system", "short-circuit current", "33 kA")
            .set("breaker", "short-circuit current through the breaker", "30.8 kA")
            .silent("breaking-current-below-duty");
    }

    #[test]
    fn a_decayed_current_that_fits_is_a_caution_with_both_numbers() {
        let bay = Bay::new()
            .set("system", "short-circuit current", "33 kA")
            .set("system", "symmetrical short-circuit breaking current", "30 kA")
            .set("system", "minimum time delay", "0.1 s");
        let finding = bay.one("decayed-current-basis");
        assert_eq!(finding.kind, FindingKind::Caution);
        assert!(finding.message.contains("30 kA") && finding.message.contains("33 kA"), "{}", finding.message);
        bay.silent("breaking-current-below-duty");
        bay.clone()
            .set("system", "symmetrical short-circuit breaking current", "32 kA")
            .one("breaking-current-below-duty");
        // Without its time the decayed current does not count.
        bay.clone().without("system", "minimum time delay").one("breaking-current-below-duty");
        Bay::new().silent("decayed-current-basis");
    }

    #[test]
    fn the_margin_of_the_tender() {
        let bay = Bay::new().set("tender", "short-circuit margin", "10 %");
        let finding = bay.one("short-circuit-margin");
        assert!(finding.message.contains("9.84 %"), "{}", finding.message);
        assert_eq!(finding.edits[0].text, "40 kA");
        bay.clone().set("system", "short-circuit current", "28.35 kA").silent("short-circuit-margin");
        Bay::new().silent("short-circuit-margin");
        // Below the duty the shortfall speaks alone.
        bay.set("system", "short-circuit current", "33 kA").silent("short-circuit-margin");
    }

    #[test]
    fn a_fault_level_is_no_rating() {
        let finding = Bay::new().set("breaker", ISC, "29.3 kA").one("breaking-current-not-preferred");
        assert_eq!(finding.edits[0].text, "31.5 kA");
        Bay::new().silent("breaking-current-not-preferred");
        Bay::new().set("breaker", ISC, "31.50 kA").silent("breaking-current-not-preferred");
    }

    #[test]
    fn megavoltamperes_and_kiloamperes() {
        let bay = |level: &str| Bay::new().set("system", "fault level", level);
        let finding = bay("5000 MVA at 132 kV").one("fault-level-disagrees");
        assert!(finding.message.contains("21.9 kA"), "{}", finding.message);
        bay("6500 MVA at 132 kV").silent("fault-level-disagrees");
        // Round figures agree within 5 %, at any of the usual voltages where none is stated.
        bay("7000 MVA").silent("fault-level-disagrees");
        bay("9000 MVA").one("fault-level-disagrees");
        bay("6816 MVA at 132 kV").silent("fault-level-disagrees");
        bay("6830 MVA at 132 kV").one("fault-level-disagrees");
    }
}
