//! Rules on generators, motors, endurance and double earth faults.

use super::{Check, EQUAL, Rule, breaking_current, rests_on_infeeds};
use crate::case::Case;
use crate::finding::{FindingKind, Findings};
use crate::particular::{breaker, circuit, system, tender};
use crate::quantity::{Physical, Ratio, significant};
use crate::sheet::Stated;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &GENERATOR_BREAKER_STANDARD,
    &MOTOR_CONTRIBUTION,
    &ENDURANCE_NOT_VERIFIABLE,
    &DOUBLE_EARTH_FAULT,
    &ENDURANCE_DEMAND,
];

/// A breaker at generator terminals is asked for by the standard of generator circuit-breakers.
pub static GENERATOR_BREAKER_STANDARD: Rule = Rule {
    name: "generator-breaker-standard",
    title: "A breaker at the terminals of a generator is asked for by the standard of generator circuit-breakers.",
    kind: FindingKind::Contradiction,
    basis: "scope of IEC/IEEE 62271-37-013 (from memory)",
    formula: "circuit of kind generator, up to 38 kV: 62271-37-013 or C37.013 cited",
    explanation: "At generator terminals time constant (133 ms), TRV and DC component are of another order than in a network. Up to \
                  38 kV the generator's own breaker is meant; above, the generator stands behind its transformer, and the rule is \
                  silent. Silent where no standards are cited.",
    check: Check::Case(generator_standard),
};

/// Up to this rated voltage a breaker of a generator stands at its terminals (scope of IEC/IEEE 62271-37-013, from memory).
const GENERATOR_VOLTAGE: f64 = 38e3;

fn generator_standard(case: &Case<'_>, findings: &mut Findings) {
    let Some(generator) = case.circuits_of(&["generator"]).next() else { return };
    let Some(rated) = case.rated_voltage() else { return };
    let list = case.breaker.list(&breaker::STANDARDS).or_else(|| case.tender.list(&tender::STANDARDS));
    let Some((_, statement)) = list else { return };
    if rated.value.si() > GENERATOR_VOLTAGE * (1.0 + EQUAL) || case.regimes().generator {
        return;
    }
    let message = format!(
        "{} switches a generator at {}, and the standard of generator circuit-breakers is not cited",
        case.sheet.title(),
        rated.measure
    );
    let finding = findings.add(&GENERATOR_BREAKER_STANDARD, statement.value, message);
    finding.label("the generator's standard is missing").needed("IEC/IEEE 62271-37-013");
    if let Some((_, kind)) = generator.word(&circuit::KIND) {
        finding.beside(kind, "the generator");
    }
    finding.edit("cite IEC/IEEE 62271-37-013", statement.value.end(), ", IEC/IEEE 62271-37-013");
    finding.advice("the time constant of its system-source fault is 133 ms, and the making current 2.74 times the breaking current");
}

/// Motors are counted.
pub static MOTOR_CONTRIBUTION: Rule = Rule {
    name: "motor-contribution",
    title: "The short-circuit level counts the motors where there are any.",
    kind: FindingKind::Caution,
    basis: "IEC 60909-0 (from memory)",
    formula: "a motor circuit, and motors counted: no; or a level that follows from infeeds without a motor group",
    explanation: "High-voltage motors feed the first cycles of a fault and add to the peak. Where a breaker of the system switches \
                  a motor and the level is said not to count motors, or follows from infeeds of which none is a motor group, the \
                  peak is too low. Silent where the level is stated and nothing is said of motors.",
    check: Check::Case(motors),
};

fn motors(case: &Case<'_>, findings: &mut Findings) {
    let said = case.system.yes_no(&system::MOTORS_COUNTED);
    let Some((false, statement)) = said else {
        if said.is_none() {
            motors_among_infeeds(case, findings);
        }
        return;
    };
    let Some(motor) = case.circuits_of(&["motor", "pumped storage"]).next() else { return };
    let message = "the short-circuit level leaves the motors out, and this system feeds motors: they add to the peak";
    let finding = findings.add(&MOTOR_CONTRIBUTION, statement.value, message);
    finding.label("motors are not counted").advice("count the motors, or state what they add");
    if let Some((_, kind)) = motor.word(&circuit::KIND) {
        finding.beside(kind, "a motor");
    }
}

/// A level that follows from infeeds counts only the motors among them.
fn motors_among_infeeds(case: &Case<'_>, findings: &mut Findings) {
    let stated = [&system::SHORT_CIRCUIT_CURRENT, &system::FAULT_LEVEL].into_iter().any(|p| case.system.mentions(p));
    let counted = case.infeeds.parts.iter().any(|part| part.is_motor);
    let (Some(three), false, false) = (case.duty.infeeds.three_phase.as_ref(), stated, counted) else { return };
    let Some((_, kind)) =
        case.circuits_of(&["motor", "pumped storage"]).next().and_then(|motor| motor.word(&circuit::KIND))
    else {
        return;
    };
    let message = "this breaker feeds a motor, and no infeed of the system is a motor group: motors add to the peak";
    let finding = findings.add(&MOTOR_CONTRIBUTION, kind.value, message);
    finding.label("a motor that is not counted").advice(
        "add an infeed of kind motor group, or motors counted: yes to the system where the motors are within another infeed",
    );
    rests_on_infeeds(finding, three);
}

/// An endurance demand can be verified.
pub static ENDURANCE_NOT_VERIFIABLE: Rule = Rule {
    name: "endurance-not-verifiable",
    title: "A demand for electrical endurance is a class or a number that a test can show.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-100:2021 classes E1, E2; IEC/TR 62271-310 (from memory)",
    formula: "E2 up to 52 kV; above, a number of short-circuit interruptions",
    explanation: "The classes E1 and E2 are defined up to 52 kV. Above, a class has no test and the number of interruptions at rated \
                  current is what can be asked for.",
    check: Check::Case(endurance),
};

/// The classes of electrical endurance end here (IEC 62271-100, from memory).
const ENDURANCE_CLASSES_TO: f64 = 52e3;

fn endurance(case: &Case<'_>, findings: &mut Findings) {
    let (Some((class, _)), Some(rated)) = (case.breaker.class(&breaker::CLASSES, 'E'), case.rated_voltage()) else {
        return;
    };
    let numbered = case.breaker.mentions(&breaker::NUMBER_OF_SHORT_CIRCUIT_INTERRUPTIONS);
    if rated.value.si() <= ENDURANCE_CLASSES_TO * (1.0 + EQUAL) || numbered {
        return;
    }
    let message =
        format!("class {class} has no test at {}: the classes of electrical endurance end at 52 kV", rated.measure);
    findings
        .add(&ENDURANCE_NOT_VERIFIABLE, class.place, message)
        .label("no test at this voltage")
        .stated(class.to_string())
        .beside(rated.statement, "the rated voltage")
        .advice("state the number of short-circuit interruptions by IEC/TR 62271-310 instead");
}

/// In isolated and resonant-earthed systems the double earth fault is recognised.
pub static DOUBLE_EARTH_FAULT: Rule = Rule {
    name: "double-earth-fault",
    title: "In isolated and resonant-earthed systems the duty of a double earth fault is recognised.",
    kind: FindingKind::Remark,
    basis: "IEC 62271-100:2008 6.108 (from memory)",
    formula: "0.87 Isc across sqrt3 times the phase voltage",
    explanation: "Two earth faults in two phases, one on each side of the breaker, put the voltage between phases across one pole. \
                  The standard has a test for it; whoever wants it says so.",
    check: Check::Case(double_earth),
};

fn double_earth(case: &Case<'_>, findings: &mut Findings) {
    let Some((word @ ("isolated" | "resonant earthed"), statement)) = case.system.word(&system::NEUTRAL) else {
        return;
    };
    if case.breaker.mentions(&breaker::DOUBLE_EARTH_FAULT_BREAKING_CURRENT) {
        return;
    }
    let isc = breaking_current(case);
    let place = isc.as_ref().map_or(case.sheet.heading, Stated::place);
    let message = format!("with the neutral {word}, the duty of a double earth fault is not stated");
    let finding = findings.add(&DOUBLE_EARTH_FAULT, place, message);
    finding.label("double earth faults may happen").beside(statement, "the earthing of the neutral");
    if let Some(isc) = isc {
        let text = isc.like(isc.value * (3f64.sqrt() / 2.0));
        finding.needed(text.as_str()).working(format!("0.87 Isc = 0.87 x {} = {text}", isc.measure));
        finding.edit(
            format!("state {text}"),
            case.sheet.end,
            format!("\n    {}: {text}", breaker::DOUBLE_EARTH_FAULT_BREAKING_CURRENT.label),
        );
    }
}

/// An endurance demand is within what breakers do.
pub static ENDURANCE_DEMAND: Rule = Rule {
    name: "endurance-demand",
    title: "The number of full short-circuits before maintenance is within what is usual.",
    kind: FindingKind::Remark,
    basis: "public article on class E2 that cites IEC/TR 62271-310; from memory else",
    formula: "number of interruptions at rated current <= about 20",
    explanation: "A demand far above what breakers are tested for restricts the bidders or comes back as a deviation. Said as a \
                  remark, since interrupters differ.",
    check: Check::Case(demand),
};

/// Full short-circuits above which a demand is unusual (common practice, no source).
const USUAL_INTERRUPTIONS: f64 = 20.0;

fn demand(case: &Case<'_>, findings: &mut Findings) {
    let Some(number) = case.breaker.quantity::<Ratio>(&breaker::NUMBER_OF_SHORT_CIRCUIT_INTERRUPTIONS) else { return };
    if number.value.value < USUAL_INTERRUPTIONS {
        return;
    }
    let count = significant(number.value.value, 4);
    let message =
        format!("{count} full short-circuits before maintenance exceed what is usual: confirm that they are needed");
    findings
        .add(&ENDURANCE_DEMAND, number.place(), message)
        .label("an unusual demand")
        .stated(count.as_str())
        .advice("state the current to which the number belongs; most faults are well below the rated current");
}

#[cfg(test)]
mod tests {
    use crate::rules::testing::Bay;

    #[test]
    fn a_generator_has_a_standard_of_its_own() {
        let bay = |ur: &str| {
            Bay::new().set("breaker", "rated voltage", ur).set("system", "highest voltage", ur).set(
                "circuit",
                "kind",
                "generator",
            )
        };
        bay("17.5 kV").one("generator-breaker-standard");
        bay("17.5 kV").set("tender", "standards", "IEC/IEEE 62271-37-013:2021").silent("generator-breaker-standard");
        // Behind its transformer, and just at the border.
        bay("145 kV").silent("generator-breaker-standard");
        bay("38 kV").one("generator-breaker-standard");
        Bay::new().silent("generator-breaker-standard");
    }

    #[test]
    fn motors_that_are_left_out() {
        let bay = |counted: &str| Bay::new().set("circuit", "kind", "motor").set("system", "motors counted", counted);
        bay("no").one("motor-contribution");
        bay("yes").silent("motor-contribution");
        Bay::new().set("circuit", "kind", "motor").silent("motor-contribution");
        Bay::new().set("system", "motors counted", "no").silent("motor-contribution");
    }

    #[test]
    fn motors_that_no_infeed_counts() {
        let bay = |more: &str| {
            let bay = Bay::new().without("system", "short-circuit current").set("circuit", "kind", "motor");
            bay.and("infeed Grid into Ring\n    kind: network\n    short-circuit current: 28 kA\n    X/R: 13\n")
                .and(more)
        };
        let motors = "infeed M into Ring\n    kind: motor group\n    rated voltage: 132 kV\n    rated power: 20 MVA\n    starting current ratio: 5\n";
        bay("").one("motor-contribution");
        bay(motors).silent("motor-contribution");
        bay("").set("system", "motors counted", "yes").silent("motor-contribution");
        bay("").set("system", "short-circuit current", "28 kA").silent("motor-contribution");
        bay("").set("circuit", "kind", "transformer").silent("motor-contribution");
    }

    #[test]
    fn endurance_classes_end_at_52_kv() {
        let bay = |ur: &str| Bay::new().set("breaker", "classes", "C2, E2, M2").set("breaker", "rated voltage", ur);
        bay("145 kV").one("endurance-not-verifiable");
        bay("52 kV").silent("endurance-not-verifiable");
        bay("72.5 kV").one("endurance-not-verifiable");
        bay("145 kV").set("breaker", "number of short-circuit interruptions", "12").silent("endurance-not-verifiable");
        Bay::new().silent("endurance-not-verifiable");
    }

    #[test]
    fn double_earth_faults_of_isolated_systems() {
        let finding = Bay::new().set("system", "neutral", "isolated").one("double-earth-fault");
        assert_eq!(finding.needed.expect("a current").text, "27.3 kA");
        Bay::new().set("system", "neutral", "resonant earthed").one("double-earth-fault");
        Bay::new().set("system", "neutral", "impedance earthed").silent("double-earth-fault");
        Bay::new()
            .set("system", "neutral", "isolated")
            .set("breaker", "double-earth-fault breaking current", "27.3 kA")
            .silent("double-earth-fault");
    }

    #[test]
    fn unusual_endurance() {
        let bay = |n: &str| Bay::new().set("breaker", "number of short-circuit interruptions", n);
        bay("40").one("endurance-demand");
        bay("20").one("endurance-demand");
        bay("19").silent("endurance-demand");
        Bay::new().silent("endurance-demand");
    }
}
