//! Rules on the recovery voltage of the network against what the breaker withstands at that current.

use super::{Check, EQUAL, Rule, breaking_current};
use crate::case::Case;
use crate::duty::{percent, withstand};
use crate::finding::{Datum, Finding, FindingKind, Findings};
use crate::particular::{Particular, breaker, circuit, system};
use crate::physics::network_trv::Withstand;
use crate::quantity::{ElectricCurrent, ElectricPotential, Physical, Ratio, Time, VoltageRate, significant};
use crate::sheet::{Facts, Stated, Statement};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&TRV_ABOVE_ENVELOPE];

/// The network's recovery voltage lies below the envelope.
pub static TRV_ABOVE_ENVELOPE: Rule = Rule {
    name: "trv-above-envelope",
    title: "The recovery voltage of the network lies below the standard envelope at that current.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-100:2021, IEC/IEEE 62271-37-013 (envelopes), IEEE C37.011 (interpolation and network) (from memory)",
    formula: "peak and rate of rise of the study, or sqrt2 w I Zeq of the lines, against T10, T30, T60, T100 interpolated at I/Isc",
    explanation: "What a study states counts: in a circuit of a fault in it, in the system of a fault at the busbar; of the latter else the rate that lines, cables and apparatus at the busbar \
                  give, as far as the infeeds say what they are for a wave. Peak and rate are two findings: the one asks for a higher \
                  rating or a lower recovery voltage, the other for capacitance, or a higher breaking current, of which the fault is \
                  then a smaller share. A generator circuit-breaker is held against the table of its own standard, by the power of \
                  the transformer at the busbar, else of the generator. Silent above the rated breaking current, where the tables \
                  have no envelope, where TRV mitigation is asked for, and where the network says too little.",
    check: Check::Case(above),
};

fn above(case: &Case<'_>, findings: &mut Findings) {
    if case.breaker.mentions(&breaker::TRV_MITIGATION) {
        return;
    }
    for part in &case.circuits {
        // Of a fault in a circuit nothing but the study tells the current.
        study(case, (&part.facts, OF_CIRCUIT), None, findings);
    }
    let studied = [&system::PROSPECTIVE_TRV_PEAK, &system::PROSPECTIVE_TRV_RATE_OF_RISE];
    if studied.into_iter().any(|p| case.system.mentions(p)) {
        let of_duty = case.duty.short_circuit_current.as_ref().map(|figure| figure.value);
        study(case, (&case.system.facts, OF_SYSTEM), of_duty, findings);
    } else {
        network(case, findings);
    }
}

/// Where a study stands: the sheet's facts, and its particulars of current, peak, rate, t3 and time to peak.
type Study<'a> = (&'a Facts, [&'static Particular; 5]);

/// The study of a fault at the busbar.
static OF_SYSTEM: [&Particular; 5] = [
    &system::PROSPECTIVE_TRV_CURRENT,
    &system::PROSPECTIVE_TRV_PEAK,
    &system::PROSPECTIVE_TRV_RATE_OF_RISE,
    &system::PROSPECTIVE_TRV_TIME_T3,
    &system::PROSPECTIVE_TRV_TIME_TO_PEAK,
];

/// The study of a fault in a circuit.
static OF_CIRCUIT: [&Particular; 5] = [
    &circuit::PROSPECTIVE_TRV_CURRENT,
    &circuit::PROSPECTIVE_TRV_PEAK,
    &circuit::PROSPECTIVE_TRV_RATE_OF_RISE,
    &circuit::PROSPECTIVE_TRV_TIME_T3,
    &circuit::PROSPECTIVE_TRV_TIME_TO_PEAK,
];

/// The rate of a studied wave: as stated, else of peak and t3, else of peak and time to peak.
fn studied_rate<'a>(
    (facts, [_, _, rate, t3, to_peak]): Study<'a>,
    peak: Option<&Stated<'a, ElectricPotential>>,
) -> Option<(VoltageRate, &'a Statement, String)> {
    if let Some(rate) = facts.quantity::<VoltageRate>(rate) {
        return Some((rate.value, rate.statement, String::new()));
    }
    let peak = peak?;
    let time: Stated<'_, Time> = facts
        .quantity(t3)
        .or_else(|| facts.quantity(to_peak))
        .filter(|time: &Stated<'_, Time>| time.value.si() > 0.0)?;
    let rate: VoltageRate = peak.value / time.value;
    Some((rate, time.statement, format!("{}/{} = {}", peak.measure, time.measure, rate.show())))
}

/// Whether the study of a fault in a circuit is stated, so that no rule has to estimate it.
pub(super) fn is_studied(part: &Facts) -> bool {
    [&circuit::PROSPECTIVE_TRV_PEAK, &circuit::PROSPECTIVE_TRV_RATE_OF_RISE].into_iter().any(|p| part.mentions(p))
}

fn study(case: &Case<'_>, study: Study<'_>, otherwise: Option<ElectricCurrent>, findings: &mut Findings) {
    let (facts, [current, peak, ..]) = study;
    let Some(current) = facts.quantity::<ElectricCurrent>(current).map(|stated| stated.value).or(otherwise) else {
        return;
    };
    let Some((allowed, share)) = withstand(case, current) else { return };
    let peak = facts.quantity::<ElectricPotential>(peak);
    if let Some(peak) = peak.as_ref().filter(|peak| peak.value.si() > allowed.peak.si() * (1.0 + EQUAL)) {
        let message = format!(
            "the recovery voltage of the study peaks at {} at {}, and the envelope at {} of the rated current at {}",
            peak.measure,
            current.show(),
            percent(share.value),
            peak.like(allowed.peak)
        );
        let finding = findings.add(&TRV_ABOVE_ENVELOPE, peak.place(), message);
        finding.label("above the peak of the envelope").stated(&peak.measure).needed(Datum::of(allowed.peak));
        finding.advice(
            "ask for a higher first-pole-to-clear factor or rated voltage, or lower the recovery voltage by arresters; state TRV \
             mitigation",
        );
        rated(case, finding, allowed, share);
    }
    let Some((rate, statement, working)) = studied_rate(study, peak.as_ref()) else { return };
    if rate.si() > allowed.rate.si() * (1.0 + EQUAL) {
        let message = format!(
            "the recovery voltage of the study rises by {} at {}, and the envelope at {} of the rated current by {}",
            rate.show(),
            current.show(),
            percent(share.value),
            allowed.rate.show()
        );
        let finding = findings.add(&TRV_ABOVE_ENVELOPE, statement.value, message);
        finding
            .label("steeper than the envelope")
            .stated(Datum::of(rate))
            .needed(Datum::of(allowed.rate))
            .working(working);
        finding.advice(STEEP);
        rated(case, finding, allowed, share);
    }
}

/// What cures a steep rise.
const STEEP: &str = "ask for capacitance at the busbar (TRV mitigation), or a higher breaking current, of which the fault is a smaller share";

fn network(case: &Case<'_>, findings: &mut Findings) {
    let trv = &case.duty.network_trv;
    let share = case.breaker.quantity(&breaker::SHORT_CIRCUIT_CURRENT_THROUGH_THE_BREAKER).map(|stated| stated.value);
    let Some(current) = share.or_else(|| case.duty.short_circuit_current.as_ref().map(|figure| figure.value)) else {
        return;
    };
    let (Some((allowed, share)), Some(isc)) = (withstand(case, current), breaking_current(case)) else { return };
    let at = format!("at {}, {} of the rated breaking current, ", current.show(), percent(share.value));
    let slack = 1.0 + case.policy.trv_tolerance;
    if let Some(rate) = trv.rate.as_ref().filter(|rate| rate.value.si() > allowed.rate.si() * slack) {
        let message = format!(
            "{at}the network lets the recovery voltage rise by {}, and the envelope by {}",
            rate.value.show(),
            allowed.rate.show()
        );
        let finding = findings.add(&TRV_ABOVE_ENVELOPE, isc.place(), message);
        finding.label("the network's recovery voltage is steeper");
        finding.stated(Datum::of(allowed.rate)).needed(Datum::of(rate.value)).working(rate.working.to_string());
        finding.advice(STEEP);
        shaped(case, finding, allowed, share);
    }
    let factor = case.breaker.quantity::<Ratio>(&breaker::FIRST_POLE_TO_CLEAR_FACTOR);
    let peak = trv.peak.as_ref().filter(|peak| peak.value.si() > allowed.peak.si() * slack);
    // A factor below that of the earthing is told by its own rule, and raises the peak by itself.
    let low =
        factor.as_ref().zip(case.duty.first_pole_factor.as_ref()).is_some_and(|(f, needed)| f.value < needed.value);
    if let (Some(peak), Some(factor), false) = (peak, factor, low) {
        let message = format!(
            "{at}a reflection lets the recovery voltage peak at {}, and the envelope at {}",
            peak.value.show(),
            allowed.peak.show()
        );
        let finding = findings.add(&TRV_ABOVE_ENVELOPE, factor.place(), message);
        finding.label("the network's recovery voltage is higher");
        finding.stated(Datum::of(allowed.peak)).needed(Datum::of(peak.value)).working(peak.working.to_string());
        finding.advice(
            "attenuation on the line is not counted: have it studied, or ask for a higher factor; state TRV mitigation",
        );
        shaped(case, finding, allowed, share);
    }
}

/// What shapes the wave, beside the envelope.
fn shaped(case: &Case<'_>, finding: &mut Finding, allowed: Withstand, share: Ratio) {
    for place in &case.duty.network_trv.shaped_by {
        finding.related(*place, "shapes the recovery voltage");
    }
    rated(case, finding, allowed, share);
}

/// The envelope in the working, and what it hangs on.
fn rated(case: &Case<'_>, finding: &mut Finding, allowed: Withstand, share: Ratio) {
    let (peak, rate) = (allowed.peak.show(), allowed.rate.show());
    finding.working(if case.is_generator_breaker() {
        format!("IEC/IEEE 62271-37-013: peak {peak}, rate {rate}, by the power of what feeds the fault")
    } else {
        let share = significant(share.value, 3);
        format!("envelope at I/Isc = {share}: peak {peak}, rate {rate}, linear between the duties")
    });
    if let Some(isc) = breaking_current(case)
        && isc.place() != finding.place
    {
        finding.beside(isc.statement, "the rated breaking current");
    }
    if let Some(kpp) = case.breaker.quantity::<Ratio>(&breaker::FIRST_POLE_TO_CLEAR_FACTOR)
        && kpp.place() != finding.place
    {
        finding.beside(kpp.statement, "the first-pole-to-clear factor");
    }
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const RULE: &str = "trv-above-envelope";

    /// The clean bay (28.4 kA of 31.5 kA, 145 kV, kpp 1.3) with lines of 350 and 600 ohm at the busbar.
    fn lines(number: u32) -> Bay {
        Bay::new().and(&format!(
            "infeed Lines into Ring\n    kind: overhead line\n    number in parallel: {number}\n    length: 30 km\n    \
             surge impedance: 350 ohm\n    zero-sequence surge impedance: 600 ohm\n"
        ))
    }

    /// sqrt2 w 28.4 kA Zeq: 1.71 kV/us of three lines and 2.56 of two, against 2.25 at 90.2 % of the rated current.
    #[test]
    fn few_lines_let_it_rise_faster() {
        let finding = lines(2).one(RULE);
        assert_eq!(finding.kind, FindingKind::Shortfall);
        assert!(
            finding.message.contains("2.56 kV/us") && finding.message.contains("2.25 kV/us"),
            "{}",
            finding.message
        );
        assert!(finding.working[0].contains("203 ohm of 2 lines"), "{:?}", finding.working);
        lines(3).silent(RULE);
        Bay::new().silent(RULE);
        // Of the smaller current that flows through the breaker it is slower, and a larger rating withstands more at that current.
        lines(2).set("breaker", "short-circuit current through the breaker", "20 kA").silent(RULE);
        lines(2).set("breaker", "TRV mitigation", "capacitor to earth").silent(RULE);
        lines(2).set("breaker", "construction", "generator circuit-breaker").silent(RULE);
    }

    /// The bay fed through a transformer, with lines that end open: K = 2 Zeq/Z is 2 for one or two equal ones, and their peak
    /// 1.74 E; beside a line from a source it is 1 and 1.37 E at most, within the standard's 1.4.
    fn fed(lines: &str) -> Bay {
        let bay = ["short-circuit current", "single-phase short-circuit current", "DC time constant", "X0/X1"]
            .into_iter()
            .fold(Bay::new(), |bay, label| bay.without("system", label));
        bay.set("system", "neutral", "isolated").set("breaker", "first-pole-to-clear factor", "1.5").and(&format!(
            "infeed T into Ring\n    kind: transformer\n    number in parallel: 4\n    rated power: 250 MVA\n    high-voltage side: 230 kV\n    \
             low-voltage side: 138 kV\n    impedance voltage: 12 %\n    load losses: 600 kW\n    winding connection: Dy5\n\
             infeed Grid into Ring through T\n    kind: network\n    nominal voltage: 220 kV\n    \
             short-circuit current: 40 kA\n    X/R: 13\n    X0/X1: 2\n    R0/X0: 0.1\n{lines}"
        ))
    }

    const WAVE: &str = "    kind: overhead line\n    length: 60 km\n    surge impedance: 350 ohm\n    zero-sequence surge impedance: 600 ohm\n";

    #[test]
    fn a_reflection_raises_the_peak() {
        let open = format!("infeed A into Ring\n{WAVE}");
        let alone = fed(&open).of(RULE);
        assert_eq!(alone.len(), 2, "{alone:#?}");
        assert_ne!(alone[0].place, alone[1].place);
        assert!(alone.iter().any(|finding| finding.message.contains("a reflection")), "{alone:#?}");
        let fed_line = format!(
            "infeed B into Ring\n{WAVE}    resistance per length: 0.1 ohm/km\n    reactance per length: 0.4 ohm/km\n    \
             zero-sequence resistance per length: 0.3 ohm/km\n    zero-sequence reactance per length: 1.2 ohm/km\n\
             infeed Far into Ring through B\n    kind: network\n    short-circuit current: 10 kA\n    nominal voltage: 132 kV\n    \
             X/R: 9\n    X0/X1: 2\n    R0/X0: 0.1\n"
        );
        let beside = fed(&format!("{open}{fed_line}")).of(RULE);
        assert!(beside.iter().all(|finding| finding.message.contains("rise by")), "{beside:#?}");
        // With a stated level nobody knows what stands at the far end.
        assert!(lines(1).of(RULE).iter().all(|finding| finding.message.contains("rise by")));
    }

    /// The delay by 203 ohm and 10 nF, 2 us beside a time constant of 58 us, flattens the line from the origin by a fifth; that by 1 nF
    /// by a twelfth, to 2.36 kV/us.
    #[test]
    fn capacitance_delays_the_rise() {
        lines(2).set("system", "capacitance at the busbar", "1 nF").one(RULE);
        lines(2).set("system", "capacitance at the busbar", "10 nF").silent(RULE);
    }

    #[test]
    fn lines_that_say_half_are_asked() {
        let half = |text: &str| Bay::new().and(&format!("infeed L into Ring\n    kind: overhead line\n{text}"));
        let finding = half("    surge impedance: 350 ohm\n").one("infeed-incomplete");
        assert!(finding.message.contains("zero-sequence surge impedance"), "{}", finding.message);
        half("    surge impedance: 350 ohm\n").silent(RULE);
        half("    surge impedance: 350 ohm\n    zero-sequence surge impedance: 600 ohm\n").silent("infeed-incomplete");
        // A source of which no wave is known may hide lines: no figure, and nothing asked.
        lines(2).and("infeed Grid into Ring\n    kind: network\n    short-circuit current: 28.4 kA\n    X/R: 13\n    X0/X1: 2.6\n    R0/X0: 0.1\n").silent(RULE);
    }

    /// At 90.2 % of 31.5 kA: peak 218 kV, 2.25 kV/us.
    #[test]
    fn a_study_is_held_against_the_envelope() {
        let study = |label: &str, value: &str| Bay::new().set("system", label, value);
        let peak = study("prospective TRV peak", "230 kV").one(RULE);
        assert!(peak.message.contains("peaks at 230 kV") && peak.message.contains("219 kV"), "{}", peak.message);
        study("prospective TRV peak", "218 kV").silent(RULE);
        let rate = study("prospective TRV rate of rise", "2.4 kV/us").one(RULE);
        assert!(rate.message.contains("rises by 2.4 kV/us"), "{}", rate.message);
        study("prospective TRV rate of rise", "2.2 kV/us").silent(RULE);
        // Two findings at two places, and the rate of peak and time.
        let both = study("prospective TRV peak", "230 kV").set("system", "prospective TRV time t3", "80 us").of(RULE);
        assert_eq!(both.len(), 2);
        assert_ne!(both[0].place, both[1].place);
        // At the current of the study, a third of the rating, the envelope is T30's: 5 kV/us.
        study("prospective TRV rate of rise", "4.5 kV/us")
            .set("system", "prospective TRV current", "9.45 kA")
            .silent(RULE);
        // In a circuit it is of a fault there, at the current of the study, without which nothing can be told.
        let circuit = |rate: &str, current: &str| {
            let bay = Bay::new().set("circuit", "prospective TRV rate of rise", rate);
            bay.set("circuit", "prospective TRV current", current)
        };
        circuit("5.4 kV/us", "9.45 kA").one(RULE);
        circuit("4.9 kV/us", "9.45 kA").silent(RULE);
        Bay::new().set("circuit", "prospective TRV rate of rise", "9 kV/us").silent(RULE);
        // A study speaks instead of the lines.
        lines(2).set("system", "prospective TRV rate of rise", "1.9 kV/us").silent(RULE);
        // Above the rated current another rule speaks.
        study("prospective TRV rate of rise", "4 kV/us").set("system", "short-circuit current", "33 kA").silent(RULE);
    }

    /// 100 MVA behind a generator circuit-breaker of 15 kV: 27.6 kV and 3.5 kV/us (from memory). An own frequency of 60 kHz gives 1.138
    /// x 27.6 kV x 120 kHz = 3.77 kV/us less what the network behind the transformer slows, 50 kHz less than 3.2.
    #[test]
    fn generator_breakers_have_a_table_of_their_own() {
        let bay = |frequency: &str| {
            let bay = ["short-circuit current", "single-phase short-circuit current", "DC time constant", "X0/X1"]
                .into_iter()
                .fold(Bay::new(), |bay, label| bay.without("system", label));
            bay.set("system", "nominal voltage", "13.8 kV")
                .set("system", "highest voltage", "15 kV")
                .set("system", "neutral", "isolated")
                .set("breaker", "rated voltage", "15 kV")
                .set("breaker", "construction", "generator circuit-breaker")
                .set("breaker", "rated short-circuit breaking current", "63 kA")
                .and(&format!(
                    "infeed T into Ring\n    kind: transformer\n    rated power: 100 MVA\n    high-voltage side: 230 kV\n    low-voltage side: 13.8 kV\n    \
                     impedance voltage: 12 %\n    load losses: 300 kW\n    winding connection: YNd5\n    natural frequency: {frequency}\n\
                     infeed Grid into Ring through T\n    kind: network\n    nominal voltage: 220 kV\n    short-circuit current: 40 kA\n    X/R: 13\n"
                ))
        };
        let finding = bay("60 kHz").one(RULE);
        assert!(finding.message.contains("3.5 kV/us"), "{}", finding.message);
        assert!(finding.working[1].contains("37-013"), "{:?}", finding.working);
        bay("50 kHz").silent(RULE);
        bay("60 kHz").set("breaker", "TRV mitigation", "capacitor to earth").silent(RULE);
    }
}
