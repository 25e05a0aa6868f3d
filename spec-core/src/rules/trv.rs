//! Rules on the transient recovery voltage.

use super::{Check, Rule};
use crate::case::Case;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{Particular, breaker, circuit, system};
use crate::physics::trv::Envelope;
use crate::quantity::{ElectricPotential, Physical, Ratio, Time, VoltageRate, significant};
use crate::sheet::Statement;
use crate::standards::Duty;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&TRV_CLASS, &TRV_VALUES_DISAGREE];

/// Below this rated voltage the TRV goes by the classes S1 and S2 (IEC 62271-100, from memory).
const CLASSES_BELOW: f64 = 100e3;

/// Below 100 kV the TRV class is that of the system.
pub static TRV_CLASS: Rule = Rule {
    name: "trv-class",
    title: "Below 100 kV the TRV class is S2 on line systems and S1 on cable systems.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-100:2021 classes S1 and S2 (from memory)",
    formula: "T100 rate of rise at 36 kV: 0.57 (S1) against 1.19 kV/us (S2)",
    explanation: "Overhead lines directly at the breaker let the recovery voltage rise about twice as fast as cables do. S1 on a \
                  line system is a shortfall, S2 on a cable system an excess, and no class at all an omission where the connection \
                  is known. What the system's connection line says counts, else what the circuits are.",
    check: Check::Case(class),
};

/// What kind of network leaves the busbar.
#[derive(Clone, Copy, PartialEq)]
pub(crate) enum Network {
    /// Overhead lines.
    Lines,
    /// Cables.
    Cables,
}

/// What leaves the busbar, and where that is said.
pub(crate) fn network<'a>(case: &'a Case<'_>) -> Option<(Network, &'a Statement)> {
    if let Some((word, statement)) = case.system.word(&system::CONNECTION) {
        return match word {
            "overhead lines" | "overhead lines and cables" => Some((Network::Lines, statement)),
            "cables" | "transformers only" => Some((Network::Cables, statement)),
            _ => None,
        };
    }
    let kinds: Vec<_> = case.circuits.iter().filter_map(|c| c.word(&circuit::KIND)).collect();
    let line = kinds.iter().find(|(kind, _)| *kind == "overhead line");
    let cable = kinds.iter().find(|(kind, _)| matches!(*kind, "cable" | "cable network"));
    match (line, cable) {
        (Some((_, statement)), _) => Some((Network::Lines, statement)),
        (None, Some((_, statement))) => Some((Network::Cables, statement)),
        (None, None) => None,
    }
}

fn class(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some((network, said))) = (case.rated_voltage(), network(case)) else { return };
    if rated.value.si() >= CLASSES_BELOW * (1.0 - 1e-6) || case.is_generator_breaker() {
        return;
    }
    let stated = case.breaker.class(&breaker::CLASSES, 'S');
    match (stated, network) {
        (Some((class, _)), Network::Lines) if class.grade == 1 => {
            let finding = findings.add(
                &TRV_CLASS,
                class.place,
                "class S1 is for cable systems, and overhead lines are connected: S2 is needed",
            );
            finding.label("the class of a cable system").stated("S1").needed("S2").beside(said, "overhead lines");
            if let Some((found, working)) = case.duty.trv.envelope(Duty::T100) {
                finding
                    .working(format!("S1, T100: {working}; t3 {}", found.t3.map_or_else(String::new, Physical::show)));
            }
            finding.replace_by("S2").advice("the TRV values and the short-line fault rating follow from the class");
        }
        (Some((class, _)), Network::Cables) if class.grade == 2 => {
            findings
                .add(&TRV_CLASS, class.place, "class S2 is for line systems, and cables are connected: S1 would do")
                .kind(FindingKind::Excess)
                .label("more than a cable system asks for")
                .stated("S2")
                .needed("S1")
                .beside(said, "what is connected")
                .replace_by("S1");
        }
        (None, _) if !unread(case) => {
            let needed = if network == Network::Lines { "S2" } else { "S1" };
            let message =
                format!("below 100 kV the TRV goes by class, and none is stated: {needed} goes with what is connected");
            let finding = findings.add(&TRV_CLASS, rated.place(), message);
            finding
                .kind(FindingKind::Omission)
                .label("S1 or S2 is missing")
                .needed(needed)
                .beside(said, "what is connected");
            match case.breaker.statement(&breaker::CLASSES) {
                Some(classes) => finding.edit(format!("add {needed}"), classes.value.end(), format!(", {needed}")),
                None => finding.edit(format!("state {needed}"), case.sheet.end, format!("\n    classes: {needed}")),
            };
        }
        _ => {}
    }
}

/// Whether classes are stated but could not be read, or are left open.
fn unread(case: &Case<'_>) -> bool {
    case.breaker.mentions(&breaker::CLASSES) && case.breaker.classes(&breaker::CLASSES).is_none()
}

/// Stated TRV values are those of the standard.
pub static TRV_VALUES_DISAGREE: Rule = Rule {
    name: "trv-values-disagree",
    title: "Stated TRV values are those of rated voltage, first-pole-to-clear factor and class.",
    kind: FindingKind::Contradiction,
    basis: "IEC 62271-100:2021 tables of TRV (rules from memory; 215 kV at 145 kV in IEC 56:1987, public digest)",
    formula: "uc = kaf kpp Ur sqrt(2/3); u1 = 0.75 kpp Ur sqrt(2/3); rate, t1 and t3 by the table of duties",
    explanation: "A schedule often carries a peak of another factor or voltage. Values within 2 % agree; more severe ones are left \
                  to the buyer. Silent where voltage, factor or class are not known, or where the tables have no row.",
    check: Check::Case(values),
};

/// One stated value against the envelope: what it should be, and whether a larger value is the more severe one.
fn compare<Q: Physical>(
    case: &Case<'_>,
    findings: &mut Findings,
    particular: &'static Particular,
    (envelope, working): &(Envelope, String),
    expected: Option<Q>,
    larger_is_harder: bool,
) {
    let (Some(stated), Some(expected)) = (case.breaker.quantity::<Q>(particular), expected) else { return };
    // A value that the checker chose is the expected one.
    if stated.statement.chosen.is_some() {
        return;
    }
    let ratio = stated.value.si() / expected.si();
    let tolerance = case.policy.trv_tolerance;
    let milder = if larger_is_harder { ratio < 1.0 - tolerance } else { ratio > 1.0 + tolerance };
    let harder = if larger_is_harder { ratio > 1.0 + tolerance } else { ratio < 1.0 - tolerance };
    let factor = case.breaker.quantity::<Ratio>(&breaker::FIRST_POLE_TO_CLEAR_FACTOR);
    // A peak that is exactly that of the other standard factor contradicts the stated one, whichever is the more severe.
    let of_other = factor.as_ref().and_then(|kpp| {
        [1.3, 1.5].into_iter().find(|other| {
            (kpp.value.value - other).abs() > 0.05 && (ratio * kpp.value.value / other - 1.0).abs() <= tolerance
        })
    });
    if !milder && (!harder || of_other.is_none()) {
        return;
    }
    let text = stated.like(expected);
    let mut message = format!(
        "the {} {} is not that of {} at {}: it is {text}",
        particular.label,
        stated.measure,
        envelope.duty.word(),
        case.rated_voltage().map_or_else(String::new, |ur| ur.measure.to_string())
    );
    if let (Some(other), Some(kpp)) = (of_other, factor.as_ref()) {
        message += &format!(
            "; {} belongs to a first-pole-to-clear factor of {other}, and {} is stated",
            stated.measure,
            significant(kpp.value.value, 3)
        );
    }
    let finding = findings.add(&TRV_VALUES_DISAGREE, stated.place(), message);
    finding.label("not the value of the standard").stated(&stated.measure);
    finding.needed(Datum { text: text.clone(), si: Some(expected.si()) }).working(working.clone());
    if let Some(kpp) = factor {
        finding.beside(kpp.statement, "the first-pole-to-clear factor");
    }
    if let Some(rated) = case.rated_voltage() {
        finding.beside(rated.statement, "the rated voltage");
    }
    finding.replace_by(text);
}

fn values(case: &Case<'_>, findings: &mut Findings) {
    type Row = (Duty, &'static Particular, &'static Particular, &'static Particular, &'static Particular);
    let rows: [Row; 5] = [
        (
            Duty::T100,
            &breaker::T100_TRV_PEAK,
            &breaker::T100_RATE_OF_RISE,
            &breaker::T100_AMPLITUDE_FACTOR,
            &breaker::T100_TIME_T3,
        ),
        (
            Duty::T60,
            &breaker::T60_TRV_PEAK,
            &breaker::T60_RATE_OF_RISE,
            &breaker::T60_AMPLITUDE_FACTOR,
            &breaker::T60_TIME_T3,
        ),
        (
            Duty::T30,
            &breaker::T30_TRV_PEAK,
            &breaker::T30_RATE_OF_RISE,
            &breaker::T30_AMPLITUDE_FACTOR,
            &breaker::T30_TIME_T3,
        ),
        (
            Duty::T10,
            &breaker::T10_TRV_PEAK,
            &breaker::T10_RATE_OF_RISE,
            &breaker::T10_AMPLITUDE_FACTOR,
            &breaker::T10_TIME_T3,
        ),
        (
            Duty::OutOfPhase,
            &breaker::OP_TRV_PEAK,
            &breaker::OP_RATE_OF_RISE,
            &breaker::OP_AMPLITUDE_FACTOR,
            &breaker::OP_TIME_T3,
        ),
    ];
    for (duty, peak, rate, amplitude, t3) in rows {
        let Some(found) = case.duty.trv.envelope(duty) else { continue };
        let envelope = &found.0;
        compare::<ElectricPotential>(case, findings, peak, found, Some(envelope.uc), true);
        compare::<VoltageRate>(case, findings, rate, found, Some(envelope.rate), true);
        compare::<Ratio>(case, findings, amplitude, found, Some(Ratio::from_si(envelope.kaf)), true);
        compare::<Time>(case, findings, t3, found, envelope.t3, false);
    }
    for (duty, u1, t1) in [
        (Duty::T100, &breaker::T100_FIRST_REFERENCE_VOLTAGE, &breaker::T100_TIME_T1),
        (Duty::T60, &breaker::T60_FIRST_REFERENCE_VOLTAGE, &breaker::T60_TIME_T1),
    ] {
        let Some(found) = case.duty.trv.envelope(duty) else { continue };
        compare::<ElectricPotential>(case, findings, u1, found, found.0.u1, true);
        compare::<Time>(case, findings, t1, found, found.0.t1, false);
    }
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    fn at_36_kv(connection: &str, classes: &str) -> Bay {
        Bay::new()
            .set("system", "nominal voltage", "33 kV")
            .set("system", "highest voltage", "36 kV")
            .set("system", "connection", connection)
            .set("breaker", "rated voltage", "36 kV")
            .set("breaker", "first-pole-to-clear factor", "1.5")
            .set("breaker", "classes", classes)
    }

    #[test]
    fn the_class_is_that_of_the_system() {
        let finding = at_36_kv("overhead lines", "C2, M2, S1").one("trv-class");
        assert_eq!((finding.kind, finding.edits[0].text.as_str()), (FindingKind::Shortfall, "S2"));
        at_36_kv("overhead lines", "C2, M2, S2").silent("trv-class");
        at_36_kv("overhead lines and cables", "S1").one("trv-class");
        at_36_kv("cables", "C2, M2, S1").silent("trv-class");
        assert_eq!(at_36_kv("cables", "S2").one("trv-class").kind, FindingKind::Excess);
    }

    #[test]
    fn no_class_is_an_omission_below_100_kv_only() {
        let finding = at_36_kv("cables", "C2, M2").one("trv-class");
        assert_eq!((finding.kind, finding.edits[0].text.as_str()), (FindingKind::Omission, ", S1"));
        at_36_kv("cables", "C2, M2").set("breaker", "rated voltage", "100 kV").silent("trv-class");
        at_36_kv("cables", "C2, M2").set("breaker", "rated voltage", "72.5 kV").one("trv-class");
        at_36_kv("cables", "later").silent("trv-class");
        Bay::new().silent("trv-class");
    }

    #[test]
    fn without_a_connection_line_the_circuits_tell() {
        let bay = at_36_kv("cables", "S1").without("system", "connection");
        bay.one("trv-class");
        bay.clone().set("circuit", "kind", "cable").silent("trv-class");
        bay.set("circuit", "kind", "transformer").silent("trv-class");
    }

    /// 215 kV at 145 kV and 1.3, 249 kV at 1.5.
    #[test]
    fn a_peak_of_the_other_factor() {
        let finding = Bay::new().set("breaker", "first-pole-to-clear factor", "1.5").set("breaker", "uc", "215 kV");
        let finding = finding.one("trv-values-disagree");
        assert!(finding.message.contains("belongs to a first-pole-to-clear factor of 1.3"), "{}", finding.message);
        assert_eq!(finding.edits[0].text, "249 kV");
        Bay::new().set("breaker", "uc", "215 kV").silent("trv-values-disagree");
        Bay::new().set("breaker", "uc", "249 kV").one("trv-values-disagree");
    }

    /// Out of phase the tables have 1.54 and 1.67 kV/us, whatever the first-pole-to-clear factor.
    #[test]
    fn out_of_phase_of_the_other_earthing() {
        let bay = |rate: &str| {
            Bay::new().set("breaker", "out-of-phase voltage factor", "2.5").set("breaker", "OP rate of rise", rate)
        };
        bay("1.67 kV/us").silent("trv-values-disagree");
        bay("1.54 kV/us").one("trv-values-disagree");
        Bay::new().set("breaker", "OP rate of rise", "1.54 kV/us").silent("trv-values-disagree");
    }

    /// Below 100 kV the times of the tables are those of 1.5; with 1.3, and beyond the tables, nothing is told.
    #[test]
    fn silent_where_the_tables_are() {
        let bay = at_36_kv("overhead lines", "S2").set("breaker", "T100 time t3", "90 us");
        bay.one("trv-values-disagree");
        bay.set("breaker", "first-pole-to-clear factor", "1.3").silent("trv-values-disagree");
        let high =
            |kv: &str| Bay::new().set("breaker", "rated voltage", kv).set("breaker", "T100 rate of rise", "1 kV/us");
        high("800 kV").one("trv-values-disagree");
        high("900 kV").silent("trv-values-disagree");
    }

    #[test]
    fn rounding_agrees_and_severer_values_are_left_to_the_buyer() {
        Bay::new().set("breaker", "uc", "212 kV").silent("trv-values-disagree");
        Bay::new().set("breaker", "uc", "211 kV").one("trv-values-disagree");
        Bay::new().set("breaker", "uc", "230 kV").silent("trv-values-disagree");
        Bay::new().set("breaker", "T30 TRV peak", "237 kV").silent("trv-values-disagree");
        Bay::new().set("breaker", "T100 rate of rise", "1.5 kV/us").one("trv-values-disagree");
        Bay::new().set("breaker", "T100 t1", "58 us").silent("trv-values-disagree");
        Bay::new().set("breaker", "T100 t1", "80 us").one("trv-values-disagree");
    }
}
