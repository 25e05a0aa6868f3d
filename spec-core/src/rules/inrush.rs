//! The rule on the inrush of banks.

use super::capacitive::BANKS;
use super::switching_special::has_measure;
use super::{Check, EQUAL, Rule};
use crate::case::{Case, Part};
use crate::duty::{InrushDuty, inductance_between_banks, inrush_limit};
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{breaker, circuit};
use crate::quantity::{ElectricCurrent, Frequency, Inductance, Physical};
use crate::sheet::Stated;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&INRUSH_CURRENT];

/// The rated inrush covers the bank that is closed beside others.
pub static INRUSH_CURRENT: Rule = Rule {
    name: "inrush-current",
    title: "Peak and frequency of the inrush of a bank are within the rated inrush making current and its frequency.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-100:2021 5.107, IEEE C37.012 (from memory)",
    formula: "Um sqrt(2/3) sqrt(Ceq/L) <= rated peak; 1/(2 pi sqrt(L Ceq)) <= rated frequency, 4250 Hz unless stated",
    explanation: "The repair is the inductance between the banks that brings both within the rating. A frequency above the rating with \
                  so small a peak that the steepness is covered is a caution, and so is what relies on controlled closing. Where a \
                  parallel bank is stated without the inductance, that is asked for. Silent where a closing resistor takes the \
                  inrush, and without a rated inrush making current, of which rating-for-object-missing speaks.",
    check: Check::Case(inrush),
};

fn inrush(case: &Case<'_>, findings: &mut Findings) {
    if case.breaker.mentions(&breaker::CLOSING_RESISTOR)
        || case.circuits_of(&BANKS).any(|part| has_measure(case, part, &["closing resistor"]))
    {
        return;
    }
    for part in case.circuits_of(&BANKS) {
        inductance_missing(case, part, findings);
    }
    if let (Some(inrush), Some(rated)) = (
        case.duty.switching.inrush.as_ref(),
        case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CAPACITOR_BANK_INRUSH_MAKING_CURRENT),
    ) {
        inrush_against(case, inrush, &rated, findings);
    }
}

fn inrush_against(case: &Case<'_>, inrush: &InrushDuty, rated: &Stated<'_, ElectricCurrent>, findings: &mut Findings) {
    let limit = inrush_limit(case);
    let (peak, frequency) = (inrush.peak.value, inrush.frequency.value);
    let high = peak.si() > rated.value.si() * (1.0 + EQUAL);
    // A bank alone swings slowly; only beside others the frequency is a duty.
    let fast = limit
        .filter(|limit| inrush.equivalent.is_some() && frequency.si() > limit.frequency.si() * (1.0 + EQUAL))
        .map(|limit| limit.frequency);
    if !high && fast.is_none() {
        return;
    }
    let steep = fast.is_some_and(|f| peak.si() * frequency.si() > rated.value.si() * f.si() * (1.0 + EQUAL));
    let controlled =
        case.breaker.word(&breaker::CONTROLLED_SWITCHING).is_some_and(|(word, _)| word.starts_with("closing"));
    let said = case.breaker.quantity::<Frequency>(&breaker::RATED_INRUSH_FREQUENCY);
    let of_rating = match (&said, fast) {
        (Some(said), _) => format!("{} and {}", rated.measure, said.measure),
        (None, Some(standard)) => format!("{} and {} of the standard", rated.measure, standard.show()),
        (None, None) => rated.measure.to_string(),
    };
    let message = format!("the inrush is {} at {}, and the rating is {of_rating}", rated.like(peak), frequency.show());
    let place = said.filter(|_| !high).map_or(rated.place(), |said| said.place());
    let finding = findings.add(&INRUSH_CURRENT, place, message);
    finding.label("below the inrush of the bank").stated(&rated.measure);
    if controlled || (!high && !steep) {
        finding.kind(FindingKind::Caution);
    }
    finding.needed(Datum { text: rated.like(peak), si: Some(peak.si()) });
    finding.working(inrush.peak.working.to_string()).working(inrush.frequency.working.to_string());
    for place in inrush.peak.places() {
        finding.related(place, "what the inrush follows from");
    }
    match limit.and_then(|limit| inrush.inductance_within(limit)) {
        Some(least) => {
            finding.working(least.working.to_string());
            let controlled = if controlled { "a controller may fail; " } else { "" };
            finding.advice(format!(
                "{controlled}{} between the banks bring it within the rating: add inrush limiting reactors for what is missing, \
                 or raise the rating and ask for its test",
                least.working.result
            ));
        }
        None => {
            finding.advice("raise the rating and ask for its test");
        }
    }
}

/// A bank beside others without the inductance between them.
fn inductance_missing(case: &Case<'_>, part: &Part<'_>, findings: &mut Findings) {
    let Some(others) = part.statement(&circuit::PARALLEL_BANK_POWER) else { return };
    if part.mentions(&circuit::INDUCTANCE_BETWEEN_BANKS) {
        return;
    }
    let least = inrush_limit(case).and_then(|limit| inductance_between_banks(case, part, limit));
    let own = part.quantity::<Inductance>(&circuit::CURRENT_LIMITING_INDUCTANCE);
    if own.zip(least.as_ref()).is_some_and(|(own, least)| own.value.si() >= least.value.si() * (1.0 - EQUAL)) {
        return;
    }
    let message =
        "a bank is closed beside others, and the inductance between them is not stated: the inrush cannot be reckoned";
    let finding = findings.add(&INRUSH_CURRENT, others.value, message);
    finding.kind(FindingKind::Omission).label("through which inductance?").related(case.sheet.heading, "the breaker");
    match least {
        Some(least) => {
            finding.needed(format!("at least {}", least.working.result)).working(least.working.to_string());
            finding.advice(format!(
                "add inductance between banks, the whole loop with its reactors; {} keep the inrush within the rating",
                least.working.result
            ));
        }
        None => {
            finding.advice("add inductance between banks, the whole loop with its reactors");
        }
    }
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const INRUSH: &str = "rated capacitor bank inrush making current";

    fn bank() -> Bay {
        Bay::new()
            .set("circuit", "kind", "capacitor bank")
            .set("circuit", "auto-reclosing", "none")
            .without("circuit", "auto-reclosing dead time")
            .set("circuit", "bank power", "10 Mvar")
    }

    fn beside(inductance: &str) -> Bay {
        bank()
            .set("breaker", "rated voltage", "24 kV")
            .set("system", "highest voltage", "24 kV")
            .set("system", "nominal voltage", "22 kV")
            .set("circuit", "parallel bank power", "10 Mvar")
            .set("circuit", "inductance between banks", inductance)
            .set("breaker", INRUSH, "20 kA")
    }

    /// Two banks of 10 Mvar at 22 kV with 20 uH between them, at 24 kV: 25.1 kA and 6.2 kHz; 43 uH bring it to 17 kA and 4.25 kHz
    /// (own calculation by IEEE C37.012, from memory).
    #[test]
    fn inrush_of_banks_side_by_side() {
        let finding = beside("20 uH").one("inrush-current");
        assert_eq!(finding.kind, FindingKind::Shortfall);
        assert!(finding.message.contains("25.1 kA") && finding.message.contains("62"), "{}", finding.message);
        assert!(finding.advice.as_ref().is_some_and(|advice| advice.contains("42.6 uH")), "{finding:?}");
        beside("43 uH").silent("inrush-current");
        // Fast, and not steep: 17.8 kA at 4.4 kHz.
        let fast = beside("40 uH").one("inrush-current");
        assert_eq!(fast.kind, FindingKind::Caution);
        beside("20 uH")
            .set("breaker", INRUSH, "26 kA")
            .set("breaker", "rated inrush frequency", "6.3 kHz")
            .silent("inrush-current");
        beside("20 uH")
            .set("breaker", INRUSH, "25 kA")
            .set("breaker", "rated inrush frequency", "6.3 kHz")
            .one("inrush-current");
        let controlled = beside("20 uH").set("breaker", "controlled switching", "closing");
        assert_eq!(controlled.one("inrush-current").kind, FindingKind::Caution);
        beside("20 uH").set("breaker", "overvoltage mitigation", "closing resistor").silent("inrush-current");
        beside("20 uH").without("breaker", INRUSH).silent("inrush-current");
    }

    #[test]
    fn the_inductance_between_banks() {
        let finding = beside("20 uH").without("circuit", "inductance between banks").one("inrush-current");
        assert_eq!(finding.kind, FindingKind::Omission);
        assert_eq!(finding.needed.as_ref().map(|datum| datum.text.as_str()), Some("at least 42.6 uH"));
        let own = beside("20 uH").without("circuit", "inductance between banks");
        own.clone().set("circuit", "current limiting inductance", "43 uH").silent("inrush-current");
        own.set("circuit", "current limiting inductance", "40 uH").one("inrush-current");
        bank().set("breaker", INRUSH, "20 kA").silent("inrush-current");
    }
}
