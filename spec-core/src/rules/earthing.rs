//! Rules on the earthing of the neutral: first-pole-to-clear and out-of-phase factors.

use super::{Check, Rule, rests_on_infeeds};
use crate::case::Case;
use crate::duty::Figure;
use crate::finding::{Datum, Finding, FindingKind, Findings};
use crate::particular::{breaker, system};
use crate::quantity::{Physical, Ratio, significant};
use crate::sheet::Stated;
use crate::standards;

/// The rules of this subject.
pub static ALL: &[&Rule] =
    &[&FIRST_POLE_FACTOR, &FIRST_POLE_FACTOR_UNUSUAL, &FIRST_POLE_FACTOR_EXCESS, &OUT_OF_PHASE_FACTOR];

/// Printed factors have two digits: 1.31 against 1.3 is a difference, 1.304 is not.
const FACTOR_SLACK: f64 = 0.005;

/// From here up a factor of 1.5 is rare (common practice, no source).
const RARE_FROM: f64 = 245e3;

/// From here up an effectively earthed neutral has factor 1.3; below, 1.5 is the standard's own (IEC 62271-100, from memory).
const FACTOR_BY_EARTHING_FROM: f64 = 100e3;

fn factor<'a>(case: &'a Case<'_>) -> Option<Stated<'a, Ratio>> {
    case.breaker.quantity(&breaker::FIRST_POLE_TO_CLEAR_FACTOR)
}

/// The first-pole-to-clear factor is not below what the earthing asks for.
pub static FIRST_POLE_FACTOR: Rule = Rule {
    name: "first-pole-factor",
    title: "The first-pole-to-clear factor is not below what the earthing of the neutral asks for.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-100:2021 5.102, IEC/TR 62271-306, IEC 60071-1 (from memory)",
    formula: "kpp = 3a/(1 + 2a), a = X0/X1 or 3 Ik3/Ik1 - 2; 1.5 where the neutral is not effectively earthed",
    explanation: "With an isolated, resonant or otherwise not effectively earthed neutral the first pole recovers against 1.5 times \
                  the phase voltage. With an earthed one it follows from X0/X1, or from the two currents. A factor above what is \
                  needed is never wrong. Silent where nothing is said of the neutral.",
    check: Check::Case(first_pole),
};

fn first_pole(case: &Case<'_>, findings: &mut Findings) {
    let (Some(stated), Some(needed)) = (factor(case), case.duty.first_pole_factor.as_ref()) else { return };
    if stated.value.value >= needed.value.value - FACTOR_SLACK {
        return;
    }
    let Some(standard) = standards::first_pole_factors().find(|f| *f >= needed.value.value - FACTOR_SLACK) else {
        return;
    };
    let number = significant(stated.value.value, 3);
    let message = match case.system.word(&system::NEUTRAL) {
        Some((word, _)) if needed.working.inputs.iter().any(|input| input.symbol == "neutral") => {
            format!(
                "a first-pole-to-clear factor of {number} contradicts a neutral that is {word}: it has to be {standard}"
            )
        }
        _ => format!(
            "the network asks for a first-pole-to-clear factor of {}, {number} is stated",
            significant(needed.value.value, 3)
        ),
    };
    let text = significant(standard, 2);
    let finding = findings.add(&FIRST_POLE_FACTOR, stated.place(), message);
    finding.label("below what the earthing asks for").stated(number.as_str());
    finding.needed(Datum { text: text.clone(), si: Some(standard) }).working(needed.working.to_string());
    rests_on(finding, needed);
    if let Some((_, neutral)) = case.system.word(&system::NEUTRAL) {
        finding.beside(neutral, "the earthing of the neutral");
    }
    finding.replace_by(text).advice("the TRV of all duties and the out-of-phase factor follow from it");
}

fn rests_on(finding: &mut Finding, figure: &Figure<Ratio>) {
    for place in figure.places() {
        finding.related(place, "the factor follows from this");
    }
    rests_on_infeeds(finding, figure);
}

/// From 245 kV a factor of 1.5 with nothing said of the neutral is a question worth asking.
pub static FIRST_POLE_FACTOR_UNUSUAL: Rule = Rule {
    name: "first-pole-factor-unusual",
    title: "From 245 kV a first-pole-to-clear factor of 1.5 is asked for on purpose.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-100:2021 tables of TRV (from memory); common practice",
    formula: "kpp = 1.5, Ur >= 245 kV, earthing not stated",
    explanation: "Systems of this voltage are nearly always effectively earthed, and few breakers are tested with 1.5. Where the \
                  neutral is stated as effectively earthed it is first-pole-factor-excess; up to 170 kV 1.5 is permitted without a \
                  word.",
    check: Check::Case(unusual),
};

fn unusual(case: &Case<'_>, findings: &mut Findings) {
    let (Some(stated), Some(rated)) = (factor(case), case.rated_voltage()) else { return };
    let known = case.duty.effectively_earthed.is_some() || case.system.mentions(&system::NEUTRAL);
    if rated.value.si() < RARE_FROM * (1.0 - 1e-6) || stated.value.value < 1.5 - FACTOR_SLACK || known {
        return;
    }
    let message =
        format!("few breakers are tested with 1.5 at {}, and nothing says that the neutral asks for it", rated.measure);
    findings
        .add(&FIRST_POLE_FACTOR_UNUSUAL, stated.place(), message)
        .label("unusual at this voltage")
        .stated("1.5")
        .beside(rated.statement, "the rated voltage")
        .advice("state the earthing of the neutral; if it is effectively earthed, 1.3 will do");
}

/// From 245 kV, with an effectively earthed neutral, 1.5 is more than is needed.
pub static FIRST_POLE_FACTOR_EXCESS: Rule = Rule {
    name: "first-pole-factor-excess",
    title: "From 245 kV, with an effectively earthed neutral, 1.5 and 2.5 are more than is needed.",
    kind: FindingKind::Excess,
    basis: "IEC 62271-100:2021 5.102, 5.105 (from memory); cost",
    formula: "kpp <= 1.3 and out-of-phase factor <= 2.0, Ur >= 245 kV, effectively earthed",
    explanation: "A fault clear of earth gives 1.5 in any system, for which some ask for it on purpose: give the reason for the \
                  line, and this is silent.",
    check: Check::Case(excess),
};

fn excess(case: &Case<'_>, findings: &mut Findings) {
    let Some(rated) = case.rated_voltage() else { return };
    let Some((true, earthing)) = case.duty.effectively_earthed else { return };
    if rated.value.si() < RARE_FROM * (1.0 - 1e-6) {
        return;
    }
    let out_of_phase = case.breaker.quantity::<Ratio>(&breaker::OUT_OF_PHASE_VOLTAGE_FACTOR);
    for (stated, enough, what) in
        [(factor(case), 1.3, "a first-pole-to-clear factor"), (out_of_phase, 2.0, "an out-of-phase factor")]
    {
        let Some(stated) = stated.filter(|s| s.value.value > enough + FACTOR_SLACK) else { continue };
        let text = format!("{enough:.1}");
        let message = format!(
            "{what} of {} is asked for, and the neutral is effectively earthed: {text} would do",
            significant(stated.value.value, 3)
        );
        findings
            .add(&FIRST_POLE_FACTOR_EXCESS, stated.place(), message)
            .label("more than the earthing asks for")
            .stated(significant(stated.value.value, 3))
            .needed(text.as_str())
            .related(earthing, "the earthing of the neutral")
            .replace_by(text);
    }
}

/// The out-of-phase factor goes with the earthing.
pub static OUT_OF_PHASE_FACTOR: Rule = Rule {
    name: "out-of-phase-factor",
    title: "The out-of-phase voltage factor goes with the earthing of the neutral.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-100:2021 5.105; 2.0 and 2.5 in IEC 56:1987 4.106 (public digest)",
    formula: "2.0 effectively earthed, 2.5 otherwise",
    explanation: "It follows the earthing and not the first-pole-to-clear factor, which may be asked for higher on purpose. A factor \
                  below what the earthing asks for, or 2.5 with an effectively earthed neutral below 245 kV; from there up the \
                  latter is first-pole-factor-excess.",
    check: Check::Case(out_of_phase),
};

fn out_of_phase(case: &Case<'_>, findings: &mut Findings) {
    let Some(stated) = case.breaker.quantity::<Ratio>(&breaker::OUT_OF_PHASE_VOLTAGE_FACTOR) else { return };
    let (Some((effective, earthing)), Some(rated)) = (case.duty.effectively_earthed, case.rated_voltage()) else {
        return;
    };
    let Some(needed) = standards::out_of_phase_factor(effective) else { return };
    // Below 100 kV 2.5 is the standard's own whatever the neutral.
    let below_100 = rated.value.si() < FACTOR_BY_EARTHING_FROM;
    let high = stated.value.value > needed + FACTOR_SLACK && !below_100 && rated.value.si() < RARE_FROM * (1.0 - 1e-6);
    let low = stated.value.value < needed - FACTOR_SLACK;
    if !low && !high {
        return;
    }
    let words = if effective { "effectively earthed" } else { "not effectively earthed" };
    let text = format!("{needed:.1}");
    let message = format!(
        "an out-of-phase factor of {} does not go with a neutral that is {words}: {text} does",
        significant(stated.value.value, 3)
    );
    findings
        .add(&OUT_OF_PHASE_FACTOR, stated.place(), message)
        .label("does not go with the earthing")
        .stated(significant(stated.value.value, 3))
        .needed(text.as_str())
        .related(earthing, "the earthing of the neutral")
        .replace_by(text)
        .advice("the out-of-phase TRV follows from it");
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const KPP: &str = "first-pole-to-clear factor";

    #[test]
    fn an_isolated_neutral_asks_for_one_and_a_half() {
        let bay = Bay::new().set("system", "neutral", "isolated").without("system", "X0/X1");
        let finding = bay.one("first-pole-factor");
        assert!(finding.message.contains("isolated"), "{}", finding.message);
        assert_eq!(finding.edits[0].text, "1.5");
        bay.set("breaker", KPP, "1.5").silent("first-pole-factor");
        Bay::new().silent("first-pole-factor");
    }

    /// Ik3 20 kA and Ik1 11 kA give Z0/Z1 3.45 and 1.31.
    #[test]
    fn the_factor_follows_from_data() {
        let finding = Bay::new()
            .without("system", "X0/X1")
            .set("system", "short-circuit current", "20 kA")
            .set("system", "single-phase short-circuit current", "11 kA")
            .one("first-pole-factor");
        assert!(finding.message.contains("1.31"), "{}", finding.message);
        Bay::new().set("system", "X0/X1", "3.25").silent("first-pole-factor");
        Bay::new().set("system", "X0/X1", "3.4").one("first-pole-factor");
        Bay::new().set("system", "X0/X1", "at most 3").silent("first-pole-factor");
    }

    #[test]
    fn more_than_the_duty_is_permitted() {
        let bay = Bay::new().set("breaker", KPP, "1.5");
        for rule in
            ["first-pole-factor", "first-pole-factor-unusual", "first-pole-factor-excess", "out-of-phase-factor"]
        {
            bay.silent(rule);
        }
    }

    fn at(ur: &str) -> Bay {
        Bay::new().set("system", "highest voltage", ur).set("breaker", "rated voltage", ur).set("breaker", KPP, "1.5")
    }

    fn unsaid(bay: Bay) -> Bay {
        bay.without("system", "neutral")
            .without("system", "X0/X1")
            .without("system", "single-phase short-circuit current")
    }

    #[test]
    fn at_245_kv_it_is_a_question_or_an_excess_and_never_both() {
        let said = at("245 kV");
        assert_eq!(said.one("first-pole-factor-excess").kind, FindingKind::Excess);
        said.silent("first-pole-factor-unusual");
        let not_said = unsaid(at("245 kV"));
        not_said.one("first-pole-factor-unusual");
        not_said.silent("first-pole-factor-excess");
        unsaid(at("170 kV")).silent("first-pole-factor-unusual");
        at("170 kV").silent("first-pole-factor-excess");
        at("245 kV")
            .set("breaker", "reason for first-pole-to-clear factor", "\"faults clear of earth\"")
            .silent("first-pole-factor-excess");
    }

    #[test]
    fn the_out_of_phase_factor_goes_with_the_earthing() {
        const OOP: &str = "out-of-phase voltage factor";
        assert_eq!(Bay::new().set("breaker", OOP, "2.5").one("out-of-phase-factor").edits[0].text, "2.0");
        Bay::new().silent("out-of-phase-factor");
        let isolated = Bay::new().set("system", "neutral", "isolated").without("system", "X0/X1");
        assert_eq!(isolated.one("out-of-phase-factor").edits[0].text, "2.5");
        isolated.set("breaker", OOP, "2.5").silent("out-of-phase-factor");
        // At 245 kV and above it is an excess of its own.
        at("245 kV").set("breaker", OOP, "2.5").silent("out-of-phase-factor");
    }
}
