//! Rules on the continuous current along the bay, in thin air, in overload, and at the other frequency.

use super::{Check, EQUAL, Rule, add_line};
use crate::case::Case;
use crate::finding::{FindingKind, Findings};
use crate::particular::{breaker, site};
use crate::quantity::{ElectricCurrent, Frequency, Length, Physical};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&BAY_CURRENT_CHAIN, &COOLING_ALTITUDE, &OVERLOAD_INCOMPLETE, &TEMPERATURE_RISE_FREQUENCY];

/// The current is the same along the bay.
pub static BAY_CURRENT_CHAIN: Rule = Rule {
    name: "bay-current-chain",
    title: "Nothing else in the bay carries less than the breaker.",
    kind: FindingKind::Caution,
    basis: "common practice, no source",
    formula: "Ir of the breaker <= rated current of disconnector, current transformer and busbar",
    explanation: "The weakest link decides, and the breaker's current is paid for nothing, or the other was forgotten. Silent where the \
                  currents of the other apparatus are not stated. A reason for the breaker's current silences it.",
    check: Check::Case(chain),
};

fn chain(case: &Case<'_>, findings: &mut Findings) {
    let Some(rated) = case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT) else { return };
    let weakest = [
        ("disconnector", &breaker::DISCONNECTOR_RATED_CURRENT),
        ("current transformer", &breaker::CURRENT_TRANSFORMER_RATED_CURRENT),
        ("busbar", &breaker::BUSBAR_RATED_CURRENT),
    ]
    .into_iter()
    .filter_map(|(what, particular)| Some((what, case.breaker.quantity::<ElectricCurrent>(particular)?)))
    .filter(|(_, other)| other.value.si() < rated.value.si() * (1.0 - EQUAL))
    .min_by(|a, b| a.1.value.si().total_cmp(&b.1.value.si()));
    let Some((what, other)) = weakest else { return };
    let load = case.duty.load_current.as_ref();
    let short = load.is_some_and(|load| load.value.si() > other.value.si() * (1.0 + EQUAL));
    let message = format!(
        "the breaker carries {}, the {what} of the bay {}{}",
        rated.measure,
        other.measure,
        if short { ", less than the load" } else { "" }
    );
    let finding = findings.add(&BAY_CURRENT_CHAIN, rated.place(), message);
    finding.label(format!("more than the {what} carries")).stated(&rated.measure).needed(&other.measure);
    finding.beside(other.statement, format!("the {what}"));
    for place in load.iter().flat_map(|load| load.places()) {
        finding.related(place, "the largest load");
    }
    finding.advice("bring the currents of the bay to one value, or give the reason for the line");
}

/// Thin air cools less.
pub static COOLING_ALTITUDE: Rule = Rule {
    name: "cooling-altitude",
    title: "Above 2000 m the continuous current has a reserve for the thin air.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-1:2017 4.2.2 (from memory); IEEE C37.20.2, C37.100 (from memory)",
    formula: "H <= 2000 m, or Ir x factor(H) >= load with factor 0.99 at 1500 m and 0.96 at 3000 m",
    explanation: "Silent up to 2000 m, where a temperature-rise test current is asked for, and up to 3000 m where the load leaves the \
                  reserve. Above 3000 m there is no table, and the test has to show it.",
    check: Check::Case(cooling),
};

/// Cooling needs no correction up to here, m (IEC 62271-1, from memory).
const COOLING_ALTITUDE_TO: f64 = 2000.0;

fn cooling(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(altitude)) = (
        case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT),
        case.site.quantity::<Length>(&site::ALTITUDE),
    ) else {
        return;
    };
    if altitude.value.si() <= COOLING_ALTITUDE_TO * (1.0 + EQUAL)
        || case.breaker.mentions(&breaker::TEMPERATURE_RISE_TEST_CURRENT)
    {
        return;
    }
    let figure = case.duty.site.current_in_thin_air.as_ref();
    let left = figure.map(|figure| figure.value);
    let load = case.duty.load_current.as_ref();
    if left.zip(load).is_some_and(|(left, load)| left.si() >= load.value.si() * (1.0 - EQUAL)) {
        return;
    }
    let worth = left.map(|left| format!(" and is worth about {}", rated.like(left))).unwrap_or_default();
    let message = format!("at {} {} is cooled less than in the test{worth}", altitude.measure, rated.measure);
    let finding = findings.add(&COOLING_ALTITUDE, rated.place(), message);
    finding.label("cooled by thin air").stated(&rated.measure).beside(altitude.statement, "the altitude");
    if let Some(figure) = figure {
        finding.working(figure.working.to_string());
    }
    for place in load.iter().flat_map(|load| load.places()) {
        finding.related(place, "the largest load");
    }
    finding.advice(
        "ask for a reserve in the temperature-rise test: add temperature-rise test current, or take the next current",
    );
}

/// An overload has current, time, pre-load and ambient.
pub static OVERLOAD_INCOMPLETE: Rule = Rule {
    name: "overload-incomplete",
    title: "An overload is stated with its duration, the load before it, and the ambient temperature.",
    kind: FindingKind::Remark,
    basis: "IEC/TR 62271-306, IEEE C37.010 (from memory)",
    formula: "A, h, pre-load, ambient",
    explanation: "How long a breaker bears an overload depends on how hot it was. Silent where no overload is asked for.",
    check: Check::Case(overload),
};

fn overload(case: &Case<'_>, findings: &mut Findings) {
    let Some(current) = case.breaker.quantity::<ElectricCurrent>(&breaker::OVERLOAD_CURRENT) else { return };
    let missing: Vec<&str> = [&breaker::OVERLOAD_DURATION, &breaker::OVERLOAD_PRE_LOAD, &breaker::OVERLOAD_AMBIENT]
        .into_iter()
        .filter(|particular| !case.breaker.mentions(particular))
        .map(|particular| particular.label)
        .collect();
    if missing.is_empty() {
        return;
    }
    findings
        .add(
            &OVERLOAD_INCOMPLETE,
            current.place(),
            format!("an overload of {} has no {}", current.measure, missing.join(" and no ")),
        )
        .label("how long, after what, in what air?")
        .stated(&current.measure)
        .advice(format!("add {}", missing.join(" and ")));
}

/// A 60 Hz rating says whether a 50 Hz test counts.
pub static TEMPERATURE_RISE_FREQUENCY: Rule = Rule {
    name: "temperature-rise-frequency",
    title: "At 60 Hz it is said whether a temperature-rise test at 50 Hz is accepted.",
    kind: FindingKind::Remark,
    basis: "IEC 62271-1:2017 7.4 (from memory)",
    formula: "fr = 60 Hz: temperature-rise test frequency stated",
    explanation: "Losses rise with the frequency; by the standard a test at 50 Hz serves for 60 Hz with a margin, and many reports are \
                  of 50 Hz. Silent at 50 Hz, and where only standards of the IEEE are cited, whose tests are at 60 Hz.",
    check: Check::Case(test_frequency),
};

/// Where a report of the other frequency has to be spoken of, Hz.
const HIGHER_FREQUENCY: f64 = 60.0;

fn test_frequency(case: &Case<'_>, findings: &mut Findings) {
    let Some(rated) = case.breaker.quantity::<Frequency>(&breaker::RATED_FREQUENCY) else { return };
    let other = (rated.value.si() - HIGHER_FREQUENCY).abs() > HIGHER_FREQUENCY * EQUAL;
    if other || case.regimes().only_ieee() || case.breaker.mentions(&breaker::TEMPERATURE_RISE_TEST_FREQUENCY) {
        return;
    }
    let message = format!("the rating is for {}: is a temperature-rise test at 50 Hz accepted?", rated.measure);
    let finding = findings.add(&TEMPERATURE_RISE_FREQUENCY, rated.place(), message);
    finding.label("tests at 50 Hz?").stated(&rated.measure);
    add_line(finding, case.sheet, &breaker::TEMPERATURE_RISE_TEST_FREQUENCY, "60 Hz");
    add_line(finding, case.sheet, &breaker::TEMPERATURE_RISE_TEST_FREQUENCY, "50 Hz");
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    #[test]
    fn the_weakest_link_of_the_bay() {
        let bay = |ir: &str| Bay::new().set("breaker", "disconnector rated current", ir);
        let finding = bay("2000 A").set("breaker", "rated continuous current", "3150 A").one("bay-current-chain");
        assert_eq!(finding.kind, FindingKind::Caution);
        bay("2500 A").silent("bay-current-chain");
        assert!(bay("800 A").one("bay-current-chain").message.contains("less than the load"));
        Bay::new().silent("bay-current-chain");
    }

    #[test]
    fn thin_air_cools_less() {
        let bay = |altitude: &str, load: &str| {
            Bay::new().set("site", "altitude", altitude).set("circuit", "load current", load)
        };
        bay("3500 m", "1150 A").one("cooling-altitude");
        bay("2000 m", "2490 A").silent("cooling-altitude");
        // 0.96 x 2500 A = 2400 A.
        bay("3000 m", "2400 A").silent("cooling-altitude");
        assert!(bay("3000 m", "2450 A").one("cooling-altitude").message.contains("2400 A"));
        bay("3500 m", "1150 A").set("breaker", "temperature-rise test current", "2800 A").silent("cooling-altitude");
    }

    #[test]
    fn overloads_are_told_in_full() {
        let bay = Bay::new().set("breaker", "overload current", "3000 A");
        let finding = bay.one("overload-incomplete");
        assert!(finding.message.contains("duration"), "{}", finding.message);
        let whole = bay.set("breaker", "overload duration", "2 h").set("breaker", "overload pre-load", "80 %").set(
            "breaker",
            "overload ambient",
            "40 degC",
        );
        whole.silent("overload-incomplete");
        whole.without("breaker", "overload duration").one("overload-incomplete");
        Bay::new().silent("overload-incomplete");
    }

    #[test]
    fn tests_at_the_other_frequency() {
        let bay = Bay::new().set("breaker", "rated frequency", "60 Hz").set("system", "frequency", "60 Hz");
        assert_eq!(bay.one("temperature-rise-frequency").edits.len(), 2);
        bay.clone().set("breaker", "temperature-rise test frequency", "50 Hz").silent("temperature-rise-frequency");
        bay.set("tender", "standards", "IEEE C37.04:2018").silent("temperature-rise-frequency");
        Bay::new().silent("temperature-rise-frequency");
    }
}
