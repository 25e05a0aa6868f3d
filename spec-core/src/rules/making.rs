//! Rules on making and peak withstand currents.

use super::{Check, EQUAL, Rule, breaking_current, rests_on_infeeds};
use crate::case::Case;
use crate::duty::making_factor_of;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{Particular, breaker};
use crate::quantity::{ElectricCurrent, Physical, Qualifier, significant};
use crate::sheet::Stated;
use crate::standards::{PreferredCurrents, RatingSeries};

/// The rules of this subject.
pub static ALL: &[&Rule] =
    &[&MAKING_CURRENT_FACTOR, &MAKING_CURRENT_BELOW_DUTY, &PEAK_WITHSTAND_DISAGREES, &CLOSE_AND_LATCH_RMS];

fn stated<'a>(case: &'a Case<'_>, particular: &Particular) -> Option<Stated<'a, ElectricCurrent>> {
    case.breaker.quantity(particular)
}

/// The stated making current, where it is a peak.
fn making_peak<'a>(case: &'a Case<'_>) -> Option<Stated<'a, ElectricCurrent>> {
    stated(case, &breaker::RATED_SHORT_CIRCUIT_MAKING_CURRENT)
        .filter(|making| making.statement.quantity().is_none_or(|q| !q.is(Qualifier::Rms)))
}

/// The making current is its factor times the breaking current.
pub static MAKING_CURRENT_FACTOR: Rule = Rule {
    name: "making-current-factor",
    title: "The rated making current is its factor times the rated breaking current.",
    kind: FindingKind::Contradiction,
    basis: "IEC 62271-100:2021 5.103, IEC/IEEE 62271-37-013 (factors from IEC 56:1987, public digest, and from memory)",
    formula: "Ima = F Isc, F = 2.5 (50 Hz, 45 ms), 2.6 (60 Hz, 45 ms), 2.7 (special time constant), 2.74 (generator)",
    explanation: "More than 2 % below the factor is a contradiction. Up to 5 % above agrees, since makers round (78.75, 79 and 80 kA \
                  for 31.5 kA). More than 5 % above is an excess, and a caution where it is just the value of another breaking \
                  current, since then one of the two was left over from an older text.",
    check: Check::Case(factor),
};

fn factor(case: &Case<'_>, findings: &mut Findings) {
    let (Some(making), Some(breaking)) = (making_peak(case), breaking_current(case)) else { return };
    let Some((factor, why)) = making_factor_of(case, &case.duty) else { return };
    let needed = breaking.value * factor;
    let ratio = making.value.si() / needed.si();
    let policy = case.policy;
    if ratio >= 1.0 - policy.making_below - EQUAL && ratio <= 1.0 + policy.making_above + EQUAL {
        return;
    }
    let text = making.like(needed);
    let other = PreferredCurrents::of(RatingSeries::Breaking, &case.regimes().families())
        .at_or_above(ElectricCurrent::from_si(making.value.si() / factor * (1.0 - policy.making_below)))
        .filter(|isc| (making.value.si() / (isc.si() * factor) - 1.0).abs() <= policy.making_below);
    let mut message = format!(
        "{} is not {} times {}: at {why} it is {text}",
        making.measure,
        significant(factor, 3),
        breaking.measure
    );
    if let Some(other) = other {
        message += &format!("; {} belongs to {}", making.measure, breaking.like(other));
    }
    let finding = findings.add(&MAKING_CURRENT_FACTOR, making.place(), message);
    if ratio > 1.0 {
        finding.kind(if other.is_some() { FindingKind::Caution } else { FindingKind::Excess });
    }
    finding.label(format!("not {} times the breaking current", significant(factor, 3))).stated(&making.measure);
    finding.needed(Datum { text: text.clone(), si: Some(needed.si()) });
    finding.working(format!("{} x {} = {text}", significant(factor, 3), breaking.measure));
    finding.beside(breaking.statement, "the breaking current").replace_by(text);
    finding.advice("the peak withstand current follows from it");
}

/// The making current covers the peak of the duty.
pub static MAKING_CURRENT_BELOW_DUTY: Rule = Rule {
    name: "making-current-below-duty",
    title: "The rated making current covers the peak short-circuit current.",
    kind: FindingKind::Shortfall,
    basis: "IEC 60909-0, IEC 62271-100:2021 5.103 (from memory)",
    formula: "Ima >= ip = kappa sqrt2 Ik''",
    explanation: "A shortfall where the time constant of the network exceeds the rated one or its current the rated current. Where \
                  both are covered, the standard's rounded factor (2.5 is 2.4 % below kappa sqrt2 at 45 ms) is adequate by \
                  definition, and a calculated peak slightly above it is a caution.",
    check: Check::Case(below_duty),
};

fn below_duty(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(peak)) = (case.duty.making_current_rated.as_ref(), case.duty.peak_current.as_ref()) else {
        return;
    };
    if rated.value.si() >= peak.value.si() * (1.0 - EQUAL) {
        return;
    }
    let making = making_peak(case);
    let breaking = breaking_current(case);
    // A stated value that is short of its own factor, and would cover the peak with it, is told by making-current-factor.
    let by_factor =
        breaking.as_ref().zip(making_factor_of(case, &case.duty)).map(|(isc, (factor, _))| isc.value * factor);
    let slipped = making.as_ref().zip(by_factor).is_some_and(|(making, right)| {
        making.value.si() < right.si() * (1.0 - case.policy.making_below)
            && right.si() >= peak.value.si() * (1.0 - EQUAL)
    });
    if slipped {
        return;
    }
    let Some(place) = making.as_ref().or(breaking.as_ref()).map(Stated::place) else { return };
    let tau = case.duty.time_constant.as_ref().zip(case.duty.rated_time_constant.as_ref());
    let tau_covered = tau.is_some_and(|(network, rated)| network.value.si() <= rated.value.si() * (1.0 + EQUAL));
    let current_covered = breaking
        .as_ref()
        .zip(case.duty.breaking_duty.as_ref())
        .is_some_and(|(isc, duty)| duty.value.si() <= isc.value.si() * (1.0 + EQUAL));
    let adequate = tau_covered && current_covered;
    let shown = peak.value.show();
    let message = if adequate {
        format!(
            "the calculated peak {shown} is slightly above the making current {}; by definition the standard's rounded factor is \
             adequate, since current and time constant are covered",
            rated.value.show()
        )
    } else {
        format!("the making current {} is below the peak short-circuit current {shown}", rated.value.show())
    };
    let finding = findings.add(&MAKING_CURRENT_BELOW_DUTY, place, message);
    finding.kind(if adequate { FindingKind::Caution } else { FindingKind::Shortfall });
    finding.label(if making.is_some() { "below the peak" } else { "its making current is below the peak" });
    finding.stated(Datum::of(rated.value)).needed(Datum::of(peak.value));
    finding.working(peak.working.to_string());
    if making.is_none() {
        finding.working(rated.working.to_string());
    }
    if let Some(kappa) = &case.duty.peak_factor {
        finding.working(kappa.working.to_string());
    }
    for place in peak.places() {
        finding.related(place, "the peak follows from this");
    }
    rests_on_infeeds(finding, peak);
    finding.advice("take the next breaking current, or a special time constant, which brings the factor 2.7");
}

/// Peak withstand and making current are the same.
pub static PEAK_WITHSTAND_DISAGREES: Rule = Rule {
    name: "peak-withstand-disagrees",
    title: "The rated peak withstand current is the making current.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-1:2017 5.7 (from memory)",
    formula: "Ip = F Ik = Ima, with the same time constant",
    explanation: "What a breaker can close on it must also carry closed. Compared with the making current as stated, else with its \
                  factor times the breaking current, within the rounding of makers.",
    check: Check::Case(peak_withstand),
};

fn peak_withstand(case: &Case<'_>, findings: &mut Findings) {
    let (Some(peak), Some(making)) =
        (stated(case, &breaker::RATED_PEAK_WITHSTAND_CURRENT), case.duty.making_current_rated.as_ref())
    else {
        return;
    };
    let ratio = peak.value.si() / making.value.si();
    if ratio >= 1.0 - case.policy.making_below - EQUAL && ratio <= 1.0 + case.policy.making_above + EQUAL {
        return;
    }
    let text = peak.like(making.value);
    let message = format!("the peak withstand current {} is not the making current, {text}", peak.measure);
    let finding = findings.add(&PEAK_WITHSTAND_DISAGREES, peak.place(), message);
    finding.label("not the making current").stated(&peak.measure);
    finding.needed(Datum { text: text.clone(), si: Some(making.value.si()) }).working(making.working.to_string());
    for place in making.places() {
        finding.related(place, "the making current follows from this");
    }
    finding.replace_by(text);
}

/// A closing and latching current in rms belongs to the old rating structure.
pub static CLOSE_AND_LATCH_RMS: Rule = Rule {
    name: "close-and-latch-rms",
    title: "The making (closing and latching) current is stated as a peak.",
    kind: FindingKind::Caution,
    basis: "ANSI C37.06-1987 against IEEE C37.04-1999 and later (from memory)",
    formula: "old: 1.6 K I in kA rms; today: 2.6 I in kA peak at 60 Hz",
    explanation: "In the old rating structure the closing and latching current was an rms value of 1.6 K times the interrupting \
                  current. Today it is a peak. Fires on a value in kA rms, and on a bare one that is 1.6 times the breaking current.",
    check: Check::Case(rms),
};

/// Closing and latching over interrupting current in the old rating structure, with K = 1 (ANSI C37.06-1987, from memory).
const OLD_FACTOR: f64 = 1.6;

fn rms(case: &Case<'_>, findings: &mut Findings) {
    let (Some(making), Some(breaking)) =
        (stated(case, &breaker::RATED_SHORT_CIRCUIT_MAKING_CURRENT), breaking_current(case))
    else {
        return;
    };
    let is_rms = making.statement.quantity().is_some_and(|q| q.is(Qualifier::Rms));
    let is_peak = making.statement.quantity().is_some_and(|q| q.is(Qualifier::Peak));
    let old = (making.value.si() / (breaking.value.si() * OLD_FACTOR) - 1.0).abs() <= case.policy.making_below;
    if !is_rms && (is_peak || !old) {
        return;
    }
    let today = making_factor_of(case, &case.duty).map(|(factor, _)| breaking.value * factor);
    let mut message = format!("{} looks like an rms value of the old rating structure", making.measure);
    if is_rms {
        message = format!("{} is an rms value, as in the old rating structure", making.measure);
    }
    if let Some(today) = today {
        message += &format!("; today the making current of {} is {} peak", breaking.measure, making.like(today));
    }
    let finding = findings.add(&CLOSE_AND_LATCH_RMS, making.place(), message);
    finding
        .label("rms of the old structure")
        .stated(&making.measure)
        .beside(breaking.statement, "the breaking current");
    finding.working(format!("1.6 x {} = {} rms", breaking.measure, making.like(breaking.value * OLD_FACTOR)));
    if let Some(today) = today {
        let text = format!("{} peak", making.like(today));
        finding.needed(text.as_str()).replace_by(text);
    }
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const IMA: &str = "rated short-circuit making current";
    const IP: &str = "rated peak withstand current";

    fn at_60_hz(bay: Bay) -> Bay {
        bay.set("system", "frequency", "60 Hz").set("breaker", "rated frequency", "60 Hz")
    }

    #[test]
    fn rounding_is_no_contradiction() {
        for making in ["78.75 kA", "79 kA", "80 kA", "82 kA", "77.2 kA"] {
            Bay::new().set("breaker", IMA, making).silent("making-current-factor");
        }
        at_60_hz(Bay::new().set("breaker", IMA, "82 kA")).silent("making-current-factor");
    }

    #[test]
    fn more_than_two_percent_below_is_a_contradiction() {
        let finding = at_60_hz(Bay::new().set("breaker", IMA, "79 kA")).one("making-current-factor");
        assert_eq!(finding.kind, FindingKind::Contradiction);
        assert_eq!(finding.edits[0].text, "81.9 kA");
        assert_eq!(
            Bay::new().set("breaker", IMA, "77.1 kA").one("making-current-factor").kind,
            FindingKind::Contradiction
        );
    }

    #[test]
    fn more_than_five_percent_above_is_an_excess_or_left_over() {
        assert_eq!(Bay::new().set("breaker", IMA, "90 kA").one("making-current-factor").kind, FindingKind::Excess);
        Bay::new().set("breaker", IMA, "82.6 kA").silent("making-current-factor");
        let left_over = Bay::new().set("breaker", IMA, "100 kA").one("making-current-factor");
        assert_eq!(left_over.kind, FindingKind::Caution);
        assert!(left_over.message.contains("belongs to 40 kA"), "{}", left_over.message);
    }

    #[test]
    fn a_special_time_constant_has_its_factor_at_any_frequency() {
        for hertz in ["50 Hz", "60 Hz"] {
            Bay::new()
                .set("system", "frequency", hertz)
                .set("breaker", "rated frequency", hertz)
                .set("breaker", "DC time constant", "60 ms")
                .set("breaker", "rated short-circuit breaking current", "40 kA")
                .set("breaker", IMA, "108 kA")
                .silent("making-current-factor");
        }
        at_60_hz(
            Bay::new().set("breaker", "rated short-circuit breaking current", "25 kA").set("breaker", IMA, "65 kA"),
        )
        .silent("making-current-factor");
    }

    #[test]
    fn a_generator_breaker_has_its_own_factor() {
        Bay::new()
            .set("tender", "standards", "IEC/IEEE 62271-37-013:2021")
            .set("breaker", "DC time constant", "133 ms")
            .set("breaker", "rated short-circuit breaking current", "50 kA")
            .set("breaker", IMA, "137 kA")
            .silent("making-current-factor");
    }

    /// Isc 31.5, Ik 31.2, tau 45 ms, 50 Hz: ip 80.0 above 78.75 kA, adequate by definition.
    #[test]
    fn the_rounded_factor_is_adequate_by_definition() {
        let bay =
            Bay::new().set("system", "short-circuit current", "31.2 kA").set("system", "DC time constant", "45 ms");
        let finding = bay.one("making-current-below-duty");
        assert_eq!(finding.kind, FindingKind::Caution);
        assert!(finding.message.contains("80 kA"), "{}", finding.message);
        Bay::new().silent("making-current-below-duty");
    }

    #[test]
    fn beyond_time_constant_or_current_it_is_a_shortfall() {
        let bay =
            Bay::new().set("system", "short-circuit current", "31.2 kA").set("system", "DC time constant", "80 ms");
        assert_eq!(bay.one("making-current-below-duty").kind, FindingKind::Shortfall);
        let bay = Bay::new().set("system", "short-circuit current", "33 kA");
        assert_eq!(bay.one("making-current-below-duty").kind, FindingKind::Shortfall);
        // Without a stated making current that of the breaking current is compared.
        let finding = bay.without("breaker", IMA).one("making-current-below-duty");
        assert!(finding.label.contains("its making current"), "{}", finding.label);
    }

    #[test]
    fn peak_withstand_is_the_making_current() {
        let finding = Bay::new().set("breaker", IP, "62.5 kA").one("peak-withstand-disagrees");
        assert_eq!(finding.edits[0].text, "78.8 kA");
        Bay::new().silent("peak-withstand-disagrees");
        Bay::new().set("breaker", IP, "80 kA").silent("peak-withstand-disagrees");
        Bay::new().set("breaker", IP, "77.1 kA").one("peak-withstand-disagrees");
    }

    /// 31.5 kA: 50.4 kA rms then, 81.9 kA peak today at 60 Hz.
    #[test]
    fn rms_of_the_old_structure() {
        let finding = at_60_hz(Bay::new().set("breaker", IMA, "50.4 kA rms")).one("close-and-latch-rms");
        assert_eq!(finding.edits[0].text, "81.9 kA peak");
        at_60_hz(Bay::new().set("breaker", IMA, "50.4 kA rms")).silent("making-current-factor");
        at_60_hz(Bay::new().set("breaker", IMA, "50 kA")).one("close-and-latch-rms");
        at_60_hz(Bay::new().set("breaker", IMA, "50.4 kA peak")).silent("close-and-latch-rms");
        Bay::new().silent("close-and-latch-rms");
    }
}
