//! Rules on the currents of lines, cables, banks and reactors that are switched.

use super::switching_special::kind_of;
use super::{Check, EQUAL, Rule, number};
use crate::case::Case;
use crate::duty::Figure;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{Particular, breaker, circuit};
use crate::quantity::{ElectricCurrent, Physical, Ratio};
use crate::standards::{PreferredCurrents, RatingSeries, preferred_number};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &LINE_CHARGING_CURRENT,
    &CABLE_CHARGING_CURRENT,
    &BANK_CURRENT,
    &BANK_CONTINUOUS_CURRENT,
    &REACTOR_CURRENT,
    &CAPACITIVE_VOLTAGE_FACTOR,
];

/// The circuits that draw a charging current.
const CHARGED: [&str; 4] = ["overhead line", "overhead line with cable", "cable", "cable network"];
pub(super) const BANKS: [&str; 2] = ["capacitor bank", "filter bank"];

/// The rated line-charging current covers the line.
pub static LINE_CHARGING_CURRENT: Rule = Rule {
    name: "line-charging-current",
    title: "The rated line-charging breaking current covers the charging current of the line.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-100:2021 5.107 (from memory)",
    formula: "rated line-charging current >= w C' l Um/sqrt3, or the charging current stated",
    explanation: "At the highest voltage of the system. Reactors that are switched with the line take their share away; where it is \
                  not said whether they are, the finding is a caution. A rating above the preferred value is as good as any. \
                  Silent without a rating, of which rating-for-object-missing speaks, and without length and capacitance or a \
                  charging current.",
    check: Check::Case(line),
};

fn line(case: &Case<'_>, findings: &mut Findings) {
    let figure = case.duty.switching.line_charging_current.as_ref();
    let rating = [&breaker::RATED_LINE_CHARGING_BREAKING_CURRENT];
    below(case, &LINE_CHARGING_CURRENT, figure, &rating, "the charging current of the line", findings);
}

/// The rated cable-charging current covers the cable.
pub static CABLE_CHARGING_CURRENT: Rule = Rule {
    name: "cable-charging-current",
    title: "The rated cable-charging breaking current covers the charging current of the cable.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-100:2021 5.107 (from memory)",
    formula: "rated cable-charging current >= w C' l Um/sqrt3, or the charging current stated",
    explanation: "At the highest voltage of the system; of a line with cable both parts together. Reactors that are switched with the \
                  cable take their share away; where it is not said whether they are, the finding is a caution. Silent without a \
                  rating, of which rating-for-object-missing speaks, and without length and capacitance or a charging current.",
    check: Check::Case(cable),
};

fn cable(case: &Case<'_>, findings: &mut Findings) {
    let figure = case.duty.switching.cable_charging_current.as_ref();
    let rating = [&breaker::RATED_CABLE_CHARGING_BREAKING_CURRENT];
    below(case, &CABLE_CHARGING_CURRENT, figure, &rating, "the charging current of the cable", findings);
}

/// The rated bank current covers the bank.
pub static BANK_CURRENT: Rule = Rule {
    name: "bank-current",
    title: "The rated capacitor bank breaking current covers the bank.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-100:2021 5.107 (from memory)",
    formula: "rated bank current >= Q/(sqrt3 U)",
    explanation: "At the voltage of the bank, else the nominal voltage. Of single and back-to-back rating the larger counts, since a \
                  bank beside others is the harder duty and covers one alone; whether the back-to-back rating is there is asked by \
                  rating-for-object-missing. Silent without a rating or without the power of the bank.",
    check: Check::Case(bank),
};

fn bank(case: &Case<'_>, findings: &mut Findings) {
    let figure = case.duty.switching.bank_current.as_ref();
    let ratings =
        [&breaker::RATED_CAPACITOR_BANK_BREAKING_CURRENT, &breaker::RATED_BACK_TO_BACK_CAPACITOR_BANK_BREAKING_CURRENT];
    let beside = case.circuits_of(&BANKS).any(|part| part.mentions(&circuit::PARALLEL_BANK_POWER));
    let back_to_back = beside && case.breaker.mentions(&breaker::RATED_BACK_TO_BACK_CAPACITOR_BANK_BREAKING_CURRENT);
    let ratings = if back_to_back { &ratings[1..] } else { &ratings[..] };
    below(case, &BANK_CURRENT, figure, ratings, "the current of the bank", findings);
}

/// The reactor current is covered.
pub static REACTOR_CURRENT: Rule = Rule {
    name: "reactor-current",
    title: "The shunt reactor breaking current covers the reactor.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-110 (from memory)",
    formula: "shunt reactor breaking current >= Q/(sqrt3 U)",
    explanation: "At the voltage of the reactor, else the nominal voltage. Silent without the breaking current, of which \
                  rating-for-object-missing speaks, or without the power of the reactor.",
    check: Check::Case(reactor),
};

fn reactor(case: &Case<'_>, findings: &mut Findings) {
    let figure = case.duty.switching.reactor_current.as_ref();
    below(
        case,
        &REACTOR_CURRENT,
        figure,
        &[&breaker::SHUNT_REACTOR_BREAKING_CURRENT],
        "the current of the reactor",
        findings,
    );
}

/// Tells of a rating below its figure. Of several ratings the largest counts.
fn below(
    case: &Case<'_>,
    rule: &'static Rule,
    figure: Option<&Figure<ElectricCurrent>>,
    ratings: &[&Particular],
    noun: &str,
    findings: &mut Findings,
) {
    let rated = ratings
        .iter()
        .filter_map(|rating| case.breaker.quantity::<ElectricCurrent>(rating))
        .max_by(|a, b| a.value.si().total_cmp(&b.value.si()));
    let (Some(figure), Some(rated)) = (figure, rated) else { return };
    if figure.value.si() <= rated.value.si() * (1.0 + EQUAL) {
        return;
    }
    let unsaid = case.circuits_of(&CHARGED).find(|part| {
        part.mentions(&circuit::SHUNT_COMPENSATION) && !part.mentions(&circuit::COMPENSATION_SWITCHED_WITH_THE_CIRCUIT)
    });
    let label = rated.statement.particular.label;
    let message = format!("{label} of {} is below {noun}, {}", rated.measure, rated.like(figure.value));
    let finding = findings.add(rule, rated.place(), message);
    finding.label("does not cover what is switched").stated(&rated.measure).working(figure.working.to_string());
    finding.needed(Datum { text: rated.like(figure.value), si: Some(figure.value.si()) });
    for place in figure.places() {
        finding.related(place, "what the current follows from");
    }
    if let Some(part) = unsaid.filter(|_| rule.name.ends_with("charging-current")) {
        finding.kind(FindingKind::Caution);
        if let Some(reactors) = part.statement(&circuit::SHUNT_COMPENSATION) {
            finding.beside(reactors, "reactors on the circuit");
        }
        finding.advice("say whether the reactors are switched with it: add compensation switched with the circuit");
        return;
    }
    finding.advice("ask for the type test at the current that is rated; a value of the R10 series is easier to find");
    // In amperes, as these ratings are stated.
    if let Some(next) = preferred_number(figure.value.si()) {
        finding.replace_by(rated.like(ElectricCurrent::from_si(next)));
    }
}

/// The continuous current has room for harmonics.
pub static BANK_CONTINUOUS_CURRENT: Rule = Rule {
    name: "bank-continuous-current",
    title: "The rated continuous current of a bank's breaker has room for harmonics and for the tolerance of the capacitance.",
    kind: FindingKind::Shortfall,
    basis: "IEC 60871-1, IEEE C37.012 (from memory)",
    formula: "Ir >= 1.3 x 1.1 x Q/(sqrt3 U)",
    explanation: "1.3 for harmonics and overvoltage together, 1.1 for the tolerance. Silent where a load current above the current of \
                  the bank is stated, which has the harmonics in it, and where the rated current is below the load, of which \
                  continuous-current-below-load speaks.",
    check: Check::Case(bank_continuous),
};

fn bank_continuous(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(needed), Some(bank)) = (
        case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT),
        case.duty.switching.bank_continuous_current.as_ref(),
        case.duty.switching.bank_current.as_ref(),
    ) else {
        return;
    };
    let counted = case.circuits_of(&BANKS).any(|part| {
        let load = part.quantity::<ElectricCurrent>(&circuit::LOAD_CURRENT);
        load.is_some_and(|load| load.value.si() > bank.value.si() * (1.0 + EQUAL))
    });
    let short = case.duty.load_current.as_ref().is_some_and(|load| rated.value.si() < load.value.si());
    if counted || short || rated.value.si() >= needed.value.si() * (1.0 - EQUAL) {
        return;
    }
    let message = format!(
        "the bank takes {}, with harmonics and tolerance {}, more than the rated continuous current {}",
        rated.like(bank.value),
        rated.like(needed.value),
        rated.measure
    );
    let finding = findings.add(&BANK_CONTINUOUS_CURRENT, rated.place(), message);
    finding.label("too little for a bank").stated(&rated.measure);
    finding.needed(Datum { text: rated.like(needed.value), si: Some(needed.value.si()) });
    finding.working(bank.working.to_string()).working(needed.working.to_string());
    for place in bank.places() {
        finding.related(place, "the bank");
    }
    finding.advice("or state the load current of the bank with the harmonics that were measured");
    let series = PreferredCurrents::of(RatingSeries::Continuous, &case.regimes().families());
    if let Some(next) = series.at_or_above(needed.value) {
        finding.replace_by(rated.like(next));
    }
}

/// The capacitive voltage factor suits circuit and earthing.
pub static CAPACITIVE_VOLTAGE_FACTOR: Rule = Rule {
    name: "capacitive-voltage-factor",
    title: "The capacitive voltage factor suits what is switched and the earthing of the neutral.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-100:2008 6.111 (from memory)",
    formula: "kc >= 1.0 screened cables and earthed banks, 1.2 lines and belted cables, 1.4 isolated banks; 1.4 where the neutral is not effectively earthed",
    explanation: "In normal service; a standing earth fault asks for 1.4, and 1.7 where the neutral is not effectively earthed, which is \
                  for the buyer to say. A higher factor is silent. Silent without a factor, where the earthing is not known, and where \
                  the construction of the cable or the neutral of the bank would decide and is not stated.",
    check: Check::Case(voltage_factor),
};

fn voltage_factor(case: &Case<'_>, findings: &mut Findings) {
    let (Some(stated), Some(needed)) = (
        case.breaker.quantity::<Ratio>(&breaker::CAPACITIVE_VOLTAGE_FACTOR),
        case.duty.switching.voltage_factor.as_ref(),
    ) else {
        return;
    };
    if stated.value.si() >= needed.value.si() * (1.0 - EQUAL) {
        return;
    }
    let text = crate::quantity::rounded(needed.value.si(), 1);
    let what = case.circuits.iter().find_map(|part| kind_of(part)).map_or("circuit", |(kind, _)| kind);
    let message =
        format!("a capacitive voltage factor of {} is asked for, and the {what} here needs {text}", number(&stated));
    let finding = findings.add(&CAPACITIVE_VOLTAGE_FACTOR, stated.place(), message);
    finding.label("too low for circuit and earthing").stated(number(&stated)).needed(text.as_str());
    finding.working(needed.working.to_string());
    for place in needed.places() {
        finding.related(place, "the earthing of the neutral");
    }
    finding.advice("more where it has to break with a standing earth fault").replace_by(text);
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const LINE: &str = "rated line-charging breaking current";
    const CABLE: &str = "rated cable-charging breaking current";
    const BANK: &str = "rated capacitor bank breaking current";
    const BESIDE: &str = "rated back-to-back capacitor bank breaking current";

    fn switching(kind: &str) -> Bay {
        Bay::new()
            .set("circuit", "kind", kind)
            .set("circuit", "auto-reclosing", "none")
            .without("circuit", "auto-reclosing dead time")
    }

    fn at(bay: Bay, rated: &str, nominal: &str) -> Bay {
        bay.set("breaker", "rated voltage", rated).set("system", "highest voltage", rated).set(
            "system",
            "nominal voltage",
            nominal,
        )
    }

    /// 245 kV, 330 km at 0.40 A/km: 132 A, above the preferred 125 A (own calculation; IEC 62271-100, from memory).
    #[test]
    fn lines_by_a_stated_current() {
        let bay = |rated: &str| {
            at(Bay::new(), "245 kV", "220 kV").set("circuit", "charging current", "132 A").set("breaker", LINE, rated)
        };
        let finding = bay("125 A").one("line-charging-current");
        assert_eq!((finding.kind, finding.edits[0].text.as_str()), (FindingKind::Shortfall, "160 A"));
        bay("132 A").silent("line-charging-current");
        bay("131.9 A").one("line-charging-current");
        bay("160 A").silent("line-charging-current");
        bay("125 A").without("breaker", LINE).silent("line-charging-current");
    }

    /// 84 km of 9 nF/km at 145 kV take 19.9 A (own calculation), within the preferred 50 A.
    #[test]
    fn lines_by_length_and_capacitance() {
        let finding = Bay::new().set("breaker", LINE, "19 A").one("line-charging-current");
        assert!(finding.message.contains("19.9 A"), "{}", finding.message);
        assert_eq!(finding.edits[0].text, "20 A");
        Bay::new().silent("line-charging-current");
        Bay::new().set("breaker", LINE, "19 A").without("circuit", "length").silent("line-charging-current");
    }

    #[test]
    fn reactors_on_a_line_take_their_share() {
        let bay = at(Bay::new(), "420 kV", "400 kV")
            .set("circuit", "charging current", "450 A")
            .set("breaker", LINE, "400 A")
            .set("circuit", "shunt compensation", "100 Mvar");
        // 100 Mvar at 400 kV take 144 A away.
        assert_eq!(bay.one("line-charging-current").kind, FindingKind::Caution);
        bay.clone().set("circuit", "compensation switched with the circuit", "yes").silent("line-charging-current");
        let alone = bay.set("circuit", "compensation switched with the circuit", "no");
        assert_eq!(alone.one("line-charging-current").kind, FindingKind::Shortfall);
    }

    /// 72.5 kV, 50 km at 0.25 uF/km: 164 A, above the preferred 125 A (own calculation; IEC 62271-100, from memory).
    #[test]
    fn cables() {
        let bay = |rated: &str| {
            at(switching("cable"), "72.5 kV", "66 kV")
                .set("circuit", "length", "50 km")
                .set("circuit", "capacitance per length", "0.25 uF/km")
                .without("breaker", LINE)
                .set("breaker", CABLE, rated)
        };
        let finding = bay("125 A").one("cable-charging-current");
        assert!(finding.message.contains("164 A"), "{}", finding.message);
        assert_eq!(finding.edits[0].text, "200 A");
        bay("165 A").silent("cable-charging-current");
        bay("164 A").one("cable-charging-current");
        // What is not rated is one omission, with the current in it.
        let none = bay("125 A").without("breaker", CABLE);
        none.silent("cable-charging-current");
        let asked = none.one("rating-for-object-missing");
        assert!(asked.advice.as_ref().is_some_and(|advice| advice.contains("164 A")), "{asked:?}");
    }

    #[test]
    fn lines_with_cable_count_both() {
        let bay = |rating: &str, amperes: &str| {
            Bay::new()
                .without("breaker", LINE)
                .set("circuit", "kind", "overhead line with cable")
                .set("circuit", "cable section charging current", "40 A")
                .set("breaker", rating, amperes)
        };
        assert!(bay(CABLE, "50 A").one("cable-charging-current").message.contains("59.9 A"));
        bay(CABLE, "60 A").silent("cable-charging-current");
        bay(LINE, "50 A").one("line-charging-current");
        bay(LINE, "50 A").silent("cable-charging-current");
    }

    fn bank(power: &str, at: &str) -> Bay {
        switching("capacitor bank").set("circuit", "bank power", power).set("circuit", "bank voltage", at)
    }

    /// 120 Mvar at 132 kV are 525 A, above the preferred 400 A (own calculation; IEC 62271-100, from memory).
    #[test]
    fn banks() {
        let bay = |rated: &str| bank("120 Mvar", "132 kV").set("breaker", BANK, rated);
        let finding = bay("400 A").one("bank-current");
        assert!(finding.message.contains("525 A"), "{}", finding.message);
        assert_eq!(finding.edits[0].text, "630 A");
        bay("525 A").silent("bank-current");
        bay("524 A").one("bank-current");
        bay("400 A").set("breaker", BESIDE, "630 A").silent("bank-current");
        bay("630 A")
            .set("breaker", BESIDE, "400 A")
            .set("circuit", "parallel bank power", "120 Mvar")
            .one("bank-current");
        Bay::new().set("breaker", BANK, "1 A").silent("bank-current");
    }

    /// A bank of 240 A asks for 343 A (IEC 60871-1, from memory: 1.3 x 1.1).
    #[test]
    fn banks_and_their_harmonics() {
        let bay = |rated: &str| {
            bank("54.87 Mvar", "132 kV").set("circuit", "load current", "240 A").set(
                "breaker",
                "rated continuous current",
                rated,
            )
        };
        let finding = bay("315 A").one("bank-continuous-current");
        assert!(finding.message.contains("343 A"), "{}", finding.message);
        assert_eq!(finding.edits[0].text, "400 A");
        bay("344 A").silent("bank-continuous-current");
        bay("343 A").one("bank-continuous-current");
        bay("315 A").set("circuit", "load current", "300 A").silent("bank-continuous-current");
        // Below the load is another rule's.
        bay("200 A").silent("bank-continuous-current");
        bay("200 A").one("continuous-current-below-load");
    }

    /// 50 Mvar at 220 kV are 131 A (own calculation).
    #[test]
    fn reactors() {
        let bay = |rated: &str| {
            switching("shunt reactor")
                .set("circuit", "bank power", "50 Mvar")
                .set("circuit", "bank voltage", "220 kV")
                .set("breaker", "shunt reactor breaking current", rated)
        };
        assert_eq!(bay("100 A").one("reactor-current").edits[0].text, "160 A");
        bay("131 A").one("reactor-current");
        bay("132 A").silent("reactor-current");
        bay("315 A").silent("reactor-current");
    }

    #[test]
    fn voltage_factors_by_circuit_and_earthing() {
        let bay = |kc: &str| Bay::new().set("breaker", "capacitive voltage factor", kc);
        assert_eq!(bay("1.0").one("capacitive-voltage-factor").edits[0].text, "1.2");
        bay("1.2").silent("capacitive-voltage-factor");
        bay("1.4").silent("capacitive-voltage-factor");
        let isolated = switching("capacitor bank").set("circuit", "bank neutral", "isolated");
        let kc = |bay: &Bay, kc: &str| bay.clone().set("breaker", "capacitive voltage factor", kc);
        assert_eq!(kc(&isolated, "1.2").one("capacitive-voltage-factor").edits[0].text, "1.4");
        kc(&isolated, "1.4").silent("capacitive-voltage-factor");
        // Where the neutral of the bank is not stated, nothing is said.
        kc(&switching("capacitor bank"), "1.0").silent("capacitive-voltage-factor");
        let cable = switching("cable").set("circuit", "cable construction", "screened");
        kc(&cable, "1.0").silent("capacitive-voltage-factor");
        let unearthed = cable
            .set("system", "neutral", "resonant earthed")
            .without("system", "X0/X1")
            .without("system", "single-phase short-circuit current");
        kc(&unearthed, "1.0").one("capacitive-voltage-factor");
        kc(&unearthed, "1.4").silent("capacitive-voltage-factor");
    }
}
