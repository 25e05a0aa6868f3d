//! Rules on the auxiliary supply and the control.

use super::{Check, EQUAL, Rule, add_line, number, outdoors};
use crate::case::Case;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{Limit, Particular, breaker, circuit, site};
use crate::quantity::{Dimension, ElectricCurrent, ElectricPotential, Length, Measure, Physical, Qualifier, Ratio};
use crate::sheet::{Stated, Statement};
use crate::standards::{Device, Supply, coil_range, is_supply_voltage, supply_voltages};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &SUPPLY_VOLTAGE_NOT_PREFERRED,
    &COIL_VOLTAGE,
    &TRIP_COILS,
    &SUPPLY_MISMATCH,
    &ENCLOSURE_PROTECTION,
    &AUXILIARY_CONTACTS,
    &SUPERVISION_CURRENT,
    &LOW_GAS_LOGIC,
    &AUXILIARY_ALTITUDE,
];

fn voltage<'a>(case: &'a Case<'_>, particular: &Particular) -> Option<Stated<'a, ElectricPotential>> {
    case.breaker.quantity(particular)
}

/// Direct or alternating, where the text says so.
fn supply_of(statement: &Statement) -> Option<Supply> {
    let reading = statement.quantity()?;
    if reading.is(Qualifier::Dc) {
        Some(Supply::Dc)
    } else if reading.is(Qualifier::Ac) {
        Some(Supply::Ac)
    } else {
        None
    }
}

/// A direct supply voltage is a preferred one.
pub static SUPPLY_VOLTAGE_NOT_PREFERRED: Rule = Rule {
    name: "supply-voltage-not-preferred",
    title: "A direct supply voltage is on the list of preferred ones.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-1:2017 5.9 (from memory)",
    formula: "Ua in 24, 48, 60, 110, 125, 220, 250 V DC",
    explanation: "Coils and motors are made and tested for the listed voltages. Alternating voltages follow the low-voltage network \
                  of the country and are not judged, nor is a voltage that says neither DC nor AC. Write the rated voltage of the \
                  battery, not what it gives on charge.",
    check: Check::Case(not_preferred),
};

fn not_preferred(case: &Case<'_>, findings: &mut Findings) {
    for particular in [&breaker::RATED_SUPPLY_VOLTAGE, &breaker::MOTOR_SUPPLY_VOLTAGE, &breaker::HEATER_SUPPLY_VOLTAGE]
    {
        let Some(stated) = voltage(case, particular) else { continue };
        if supply_of(stated.statement) != Some(Supply::Dc) || is_supply_voltage(Supply::Dc, stated.value) {
            continue;
        }
        let (mut below, mut above) = (None, None);
        for preferred in supply_voltages(Supply::Dc) {
            if preferred < stated.value {
                below = Some(preferred);
            } else if above.is_none() {
                above = Some(preferred);
            }
        }
        let near: Vec<String> = [below, above].into_iter().flatten().map(|v| stated.like(v)).collect();
        let message = format!("{} DC is on no list of supply voltages: {} DC?", stated.measure, near.join(" or "));
        let finding = findings.add(&SUPPLY_VOLTAGE_NOT_PREFERRED, stated.place(), message);
        finding.label("not a preferred voltage").stated(&stated.measure).needed(near.join(" or "));
        for text in near {
            finding.replace_by(format!("{text} DC"));
        }
    }
}

/// Coils work on what the battery gives at the terminals.
pub static COIL_VOLTAGE: Rule = Rule {
    name: "coil-voltage",
    title: "Closing and opening devices work over the whole range of the supply at the terminals.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-1:2017 5.9, IEEE C37.06 (from memory)",
    formula: "supply at the terminals within 85 to 110 % for closing, 70 to 110 % (DC) for opening, or within the ranges stated; \
              IEEE 125 V: 90 to 140 V and 70 to 140 V",
    explanation: "At the end of its discharge, less the drop in the cables, the battery gives its least voltage, and on charge its \
                  greatest. A stated closing or opening range replaces that of the standard. Silent without a range at the \
                  terminals. Ask for a wider range, or reduce the drop.",
    check: Check::Case(coils),
};

fn coils(case: &Case<'_>, findings: &mut Findings) {
    let Some(rated) = voltage(case, &breaker::RATED_SUPPLY_VOLTAGE) else { return };
    let terminals = &breaker::SUPPLY_VOLTAGE_AT_THE_TERMINALS;
    let least = case.breaker.side::<ElectricPotential>(terminals, Limit::Least);
    let greatest = case.breaker.side::<ElectricPotential>(terminals, Limit::Greatest);
    let supply = supply_of(rated.statement).unwrap_or(Supply::Dc);
    let families = case.regimes().families();
    for (device, particular, works, fails) in [
        (Device::Closing, &breaker::CLOSING_RANGE, "closing", "the breaker will not surely close"),
        (Device::Opening, &breaker::OPENING_RANGE, "opening", "the breaker will not surely open"),
    ] {
        let stated = stated_range(case, particular, rated.value);
        let own = stated.as_ref().map(|(range, _)| *range);
        let Some((low, high)) = own.or_else(|| coil_range(device, supply, rated.value, &families)) else { continue };
        for (at, bound, short) in [
            (&least, low, least.as_ref().is_some_and(|v| v.value.si() < low.si() * (1.0 - EQUAL) - rounding(v))),
            (
                &greatest,
                high,
                greatest.as_ref().is_some_and(|v| v.value.si() > high.si() * (1.0 + EQUAL) + rounding(v)),
            ),
        ] {
            let Some(at) = at.as_ref().filter(|_| short) else { continue };
            let share = crate::duty::percent(at.value.si() / rated.value.si());
            let message = format!(
                "{} at the terminals is {share} of {}, and {works} is sure from {} to {} only: {fails}",
                at.measure,
                rated.measure,
                at.like(low),
                at.like(high)
            );
            let finding = findings.add(&COIL_VOLTAGE, at.place(), message);
            finding.label(format!("outside of the range for {works}")).stated(&at.measure);
            finding.needed(Datum { text: at.like(bound), si: Some(bound.si()) });
            finding.working(format!("{} / {} = {share}", at.measure, rated.measure));
            finding.beside(rated.statement, "the rated supply voltage");
            if let Some((_, statement)) = &stated {
                finding.beside(statement, format!("the range for {works}"));
            }
            finding.advice(format!(
                "ask for a {} that holds it, or reduce the drop between battery and breaker",
                particular.label
            ));
        }
    }
}

/// Half a unit of the last digit: 93 V is 85 % of 110 V as it is written.
fn rounding(stated: &Stated<'_, ElectricPotential>) -> f64 {
    stated.measure.half_last_digit()
}

type VoltageRange = (ElectricPotential, ElectricPotential);

/// A stated range of a device in volts; in percent it is of the rated voltage.
fn stated_range<'a>(
    case: &'a Case<'_>,
    particular: &Particular,
    rated: ElectricPotential,
) -> Option<(VoltageRange, &'a Statement)> {
    let (reading, statement) = case.breaker.quantity_reading(particular)?;
    let volts = |measure: &Measure| {
        let value = measure.si?;
        Some(ElectricPotential::from_si(if measure.dimension() == Dimension::Share {
            value * rated.si()
        } else {
            value
        }))
    };
    Some(((volts(reading.lower())?, volts(reading.upper())?), statement))
}

/// Two protections have two trip coils.
pub static TRIP_COILS: Rule = Rule {
    name: "trip-coils",
    title: "Each independent protection has a trip coil of its own.",
    kind: FindingKind::Caution,
    basis: "common practice, no source",
    formula: "trip coils >= protection systems, at most two",
    explanation: "A second main protection on a battery of its own is of little use where both work on one coil. More than two \
                  coils are not asked for, whatever the number of protections. Silent where no circuit states its protection \
                  systems.",
    check: Check::Case(trip_coils),
};

/// Breakers have two trip coils at most as a rule (common practice, no source).
const USUAL_TRIP_COILS: f64 = 2.0;

fn trip_coils(case: &Case<'_>, findings: &mut Findings) {
    let protections = case
        .circuits
        .iter()
        .filter_map(|part| part.quantity::<Ratio>(&circuit::PROTECTION_SYSTEMS))
        .max_by(|a, b| a.value.si().total_cmp(&b.value.si()));
    let Some(protections) = protections else { return };
    let needed = protections.value.si().min(USUAL_TRIP_COILS);
    let coils = case.breaker.quantity::<Ratio>(&breaker::TRIP_COILS);
    let have = match &coils {
        Some(coils) => coils.value.si(),
        None if case.breaker.mentions(&breaker::TRIP_COILS) => return,
        None => 1.0,
    };
    if have >= needed {
        return;
    }
    let text = crate::quantity::significant(needed, 3);
    match coils {
        Some(coils) => {
            let message =
                format!("{} protections trip the breaker through {} coil", number(&protections), number(&coils));
            findings
                .add(&TRIP_COILS, coils.place(), message)
                .label("fewer coils than protections")
                .stated(number(&coils))
                .needed(text.as_str())
                .beside(protections.statement, "the protections")
                .replace_by(text);
        }
        None => {
            let message = format!(
                "{} protections trip the breaker, and the number of trip coils is not stated",
                number(&protections)
            );
            let finding = findings.add(&TRIP_COILS, protections.place(), message);
            finding.label("one coil for each?").needed(text.as_str()).related(case.sheet.heading, "the breaker");
            add_line(finding, case.sheet, &breaker::TRIP_COILS, &text);
        }
    }
}

/// Coils, motor and heater suit the supplies of the station.
pub static SUPPLY_MISMATCH: Rule = Rule {
    name: "supply-mismatch",
    title: "What coils, motor and heater ask for is what the station has.",
    kind: FindingKind::Contradiction,
    basis: "IEC 62271-1:2017 5.9 (from memory); common practice",
    formula: "station voltage within 85 to 110 % of the voltage asked for; three phases only from three phases",
    explanation: "Direct voltages are compared with the battery, alternating ones with the AC supply of the station, between phases \
                  and to the neutral unless it is of one phase. A voltage that says neither DC nor AC fits where one of the two \
                  does. Silent where the station's own supply is not stated.",
    check: Check::Case(mismatch),
};

fn mismatch(case: &Case<'_>, findings: &mut Findings) {
    let battery = case.site.quantity::<ElectricPotential>(&site::STATION_BATTERY);
    let mains = case.site.quantity::<ElectricPotential>(&site::STATION_AC_SUPPLY);
    let phases = case.site.quantity::<Ratio>(&site::STATION_AC_PHASES);
    let single = phases.as_ref().is_some_and(|phases| phases.value.si() < 2.0);
    for (what, particular) in [
        ("the coils", &breaker::RATED_SUPPLY_VOLTAGE),
        ("the motor", &breaker::MOTOR_SUPPLY_VOLTAGE),
        ("the heater", &breaker::HEATER_SUPPLY_VOLTAGE),
    ] {
        let Some(asked) = voltage(case, particular) else { continue };
        let supply = supply_of(asked.statement);
        let fits_battery = battery.as_ref().is_some_and(|has| fits(&asked, has.value.si()));
        let fits_mains = mains.as_ref().is_some_and(|has| {
            let root = 3f64.sqrt();
            fits(&asked, has.value.si())
                || (!single && (fits(&asked, has.value.si() / root) || fits(&asked, has.value.si() * root)))
        });
        let (fit, has) = match supply {
            Some(Supply::Dc) => (fits_battery, battery.as_ref()),
            Some(Supply::Ac) => (fits_mains, mains.as_ref()),
            // Without a word the other supply may be the one that is meant, if it is not stated.
            None if battery.is_some() && mains.is_some() => (fits_battery || fits_mains, battery.as_ref()),
            None => continue,
        };
        let Some(has) = has.filter(|_| !fit) else { continue };
        let message = format!("{what} ask for {}, the station has {}", shown(asked.statement), shown(has.statement))
            .replace("the motor ask", "the motor asks")
            .replace("the heater ask", "the heater asks");
        findings
            .add(&SUPPLY_MISMATCH, asked.place(), message)
            .label("not what the station has")
            .stated(shown(asked.statement))
            .needed(shown(has.statement))
            .beside(has.statement, "what the station has")
            .advice("the ranges of voltage go with it")
            .replace_by(shown(has.statement));
    }
    let motor = case.breaker.quantity::<Ratio>(&breaker::MOTOR_SUPPLY_PHASES);
    if let (Some(motor), Some(station)) = (motor, phases.filter(|_| single))
        && motor.value.si() > station.value.si()
    {
        let message = format!("the motor is to have {} phases, the supply of the station has one", number(&motor));
        findings
            .add(&SUPPLY_MISMATCH, motor.place(), message)
            .label("more phases than the station has")
            .stated(number(&motor))
            .needed(number(&station))
            .beside(station.statement, "the phases of the station")
            .replace_by(number(&station));
    }
}

/// Range around a rated supply voltage in which devices work (IEC 62271-1 5.9, from memory).
const SUPPLY_RANGE: (f64, f64) = (0.85, 1.10);

fn fits(asked: &Stated<'_, ElectricPotential>, has: f64) -> bool {
    let share = has / asked.value.si();
    share >= SUPPLY_RANGE.0 - EQUAL && share <= SUPPLY_RANGE.1 + EQUAL
}

fn shown(statement: &Statement) -> String {
    statement.quantity().map(crate::sheet::QuantityReading::shown).unwrap_or_default()
}

/// Outdoor cubicles keep out dust and rain.
pub static ENCLOSURE_PROTECTION: Rule = Rule {
    name: "enclosure-protection",
    title: "Cubicles in the open keep out dust and rain.",
    kind: FindingKind::Remark,
    basis: "IEC 60529, NEMA 250 (from memory); common practice",
    formula: "outdoors: IP54 or more, or a NEMA type for the open (3, 3R, 4, 4X ...)",
    explanation: "IP3X says nothing about water. IP54 or IP55 is usual for cubicles of outdoor breakers, NEMA 4X by the sea. Silent \
                  indoors, where no code is stated, and on a text in which no code can be found.",
    check: Check::Case(enclosure),
};

/// The digits of IP54: little dust, splashing water (IEC 60529, from memory).
const OUTDOOR_CODE: (u8, u8) = (5, 4);

/// Types of NEMA 250 for indoor use only (from memory).
const INDOOR_TYPES: [&str; 7] = ["1", "2", "5", "12", "12K", "13", "11"];

enum Enclosure {
    Code(u8, u8),
    Type(bool),
}

fn enclosure_of(text: &str) -> Option<Enclosure> {
    let text = text.to_ascii_uppercase();
    if let Some((_, rest)) = text.split_once("IP") {
        let mut digits = rest.trim_start().chars().map(|c| (c, c.to_digit(10).unwrap_or(0) as u8));
        let (first, second) = (digits.next()?, digits.next()?);
        let is_code = |c: char| c.is_ascii_digit() || c == 'X';
        return (is_code(first.0) && is_code(second.0)).then_some(Enclosure::Code(first.1, second.1));
    }
    let (_, rest) = text.split_once("NEMA")?;
    let word = rest.trim_start().trim_start_matches("TYPE").split_whitespace().next()?;
    word.starts_with(|c: char| c.is_ascii_digit())
        .then(|| Enclosure::Type(!INDOOR_TYPES.contains(&word.trim_end_matches([',', '.']))))
}

fn enclosure(case: &Case<'_>, findings: &mut Findings) {
    let (Some((text, statement)), Some(outdoor)) = (case.breaker.text(&breaker::DEGREE_OF_PROTECTION), outdoors(case))
    else {
        return;
    };
    let enough = match enclosure_of(text) {
        Some(Enclosure::Code(solid, water)) => solid >= OUTDOOR_CODE.0 && water >= OUTDOOR_CODE.1,
        Some(Enclosure::Type(outdoor)) => outdoor,
        None => return,
    };
    if enough {
        return;
    }
    let message = format!("{text} in the open lets in dust or rain: IP54 or IP55, or NEMA 4X by the sea, is usual");
    findings
        .add(&ENCLOSURE_PROTECTION, statement.value, message)
        .label("too open for outdoors")
        .stated(text)
        .needed("IP54")
        .beside(outdoor, "the installation")
        .replace_by("IP54");
}

/// There are as many auxiliary contacts as the scheme uses.
pub static AUXILIARY_CONTACTS: Rule = Rule {
    name: "auxiliary-contacts",
    title: "As many auxiliary contacts are asked for as the control scheme uses.",
    kind: FindingKind::Remark,
    basis: "common practice, no source",
    formula: "contacts asked for >= contacts needed, for each of NO and NC",
    explanation: "Contacts are cheap at the order and dear on site. Compared where both the contacts asked for and those that the \
                  scheme uses are stated.",
    check: Check::Case(contacts),
};

fn contacts(case: &Case<'_>, findings: &mut Findings) {
    for (kind, asked, needed) in [
        ("NO", &breaker::AUXILIARY_CONTACTS_NO, &breaker::AUXILIARY_CONTACTS_NEEDED_NO),
        ("NC", &breaker::AUXILIARY_CONTACTS_NC, &breaker::AUXILIARY_CONTACTS_NEEDED_NC),
    ] {
        let (Some(asked), Some(needed)) =
            (case.breaker.quantity::<Ratio>(asked), case.breaker.quantity::<Ratio>(needed))
        else {
            continue;
        };
        if asked.value.si() >= needed.value.si() {
            continue;
        }
        let message = format!("the scheme uses {} {kind} contacts, {} are asked for", number(&needed), number(&asked));
        findings
            .add(&AUXILIARY_CONTACTS, asked.place(), message)
            .label("fewer than the scheme uses")
            .stated(number(&asked))
            .needed(number(&needed))
            .beside(needed.statement, "what the scheme uses")
            .replace_by(number(&needed));
    }
}

/// The supervision current cannot move the coil.
pub static SUPERVISION_CURRENT: Rule = Rule {
    name: "supervision-current",
    title: "The trip-circuit supervision current is far below the current at which the coil moves.",
    kind: FindingKind::Remark,
    basis: "common practice, no source",
    formula: "supervision current <= 10 % of the pick-up current of the coil",
    explanation: "The supervision current flows through the trip coil at rest, and must neither move it nor hold it. Where only one \
                  of the two currents is stated, the other is asked for. Silent where neither is.",
    check: Check::Case(supervision),
};

fn supervision(case: &Case<'_>, findings: &mut Findings) {
    let current = |particular| case.breaker.quantity::<ElectricCurrent>(particular);
    let supervision = current(&breaker::TRIP_CIRCUIT_SUPERVISION_CURRENT);
    let pick_up = current(&breaker::COIL_PICK_UP_CURRENT);
    let share = case.policy.supervision_share;
    match (supervision, pick_up) {
        (Some(supervision), Some(pick_up)) => {
            let most = pick_up.value * share;
            if supervision.value.si() <= most.si() * (1.0 + EQUAL) {
                return;
            }
            let text = supervision.like(most);
            let message = format!(
                "a supervision current of {} is {} of the pick-up current {}: keep it below {}",
                supervision.measure,
                crate::duty::percent(supervision.value.si() / pick_up.value.si()),
                pick_up.measure,
                crate::duty::percent(share)
            );
            findings
                .add(&SUPERVISION_CURRENT, supervision.place(), message)
                .label("near the pick-up of the coil")
                .stated(&supervision.measure)
                .needed(Datum { text: text.clone(), si: Some(most.si()) })
                .working(format!("{} x {} = {text}", crate::duty::percent(share), pick_up.measure))
                .beside(pick_up.statement, "the pick-up current of the coil")
                .advice("lower the supervision current, or ask for a coil that picks up later");
        }
        (Some(supervision), None) if !case.breaker.mentions(&breaker::COIL_PICK_UP_CURRENT) => {
            let least = supervision.value / share;
            let text = supervision.like(least);
            let message = format!(
                "a supervision current of {} flows, and the current at which the coil moves is not bounded",
                supervision.measure
            );
            let finding = findings.add(&SUPERVISION_CURRENT, supervision.place(), message);
            finding.label("held against what?").stated(&supervision.measure);
            add_line(finding, case.sheet, &breaker::COIL_PICK_UP_CURRENT, &format!("at least {text}"));
        }
        (None, Some(pick_up)) if !case.breaker.mentions(&breaker::TRIP_CIRCUIT_SUPERVISION_CURRENT) => {
            let text = pick_up.like(pick_up.value * share);
            let message =
                format!("the coil moves from {}, and the supervision current is not bounded", pick_up.measure);
            let finding = findings.add(&SUPERVISION_CURRENT, pick_up.place(), message);
            finding.label("what flows at rest?").stated(&pick_up.measure);
            add_line(finding, case.sheet, &breaker::TRIP_CIRCUIT_SUPERVISION_CURRENT, &format!("at most {text}"));
        }
        _ => {}
    }
}

/// It is said what happens when the gas is low.
pub static LOW_GAS_LOGIC: Rule = Rule {
    name: "low-gas-logic",
    title: "It is said whether the breaker blocks or trips when the gas is low.",
    kind: FindingKind::Remark,
    basis: "common practice, no source",
    formula: "low-gas action: block, or trip and lock out",
    explanation: "At the lockout level a breaker is blocked where it stands, or trips while it still can and locks out. The choice is \
                  the network's and not the maker's. Silent where no lockout or minimum functional level is stated.",
    check: Check::Case(low_gas),
};

fn low_gas(case: &Case<'_>, findings: &mut Findings) {
    let level = case
        .breaker
        .statement(&breaker::LOCKOUT_PRESSURE)
        .or_else(|| case.breaker.statement(&breaker::MINIMUM_FUNCTIONAL_PRESSURE));
    let Some(level) = level.filter(|_| !case.breaker.mentions(&breaker::LOW_GAS_ACTION)) else { return };
    findings
        .add(
            &LOW_GAS_LOGIC,
            level.value,
            "a level of gas is stated at which the breaker locks out, and not what it does then",
        )
        .label("block, or trip and lock out?")
        .needed("block, or trip and lock out")
        .advice("add low-gas action: block, or trip and lock out");
}

/// Low-voltage parts at great altitude.
pub static AUXILIARY_ALTITUDE: Rule = Rule {
    name: "auxiliary-altitude",
    title: "Above 2000 m it is said what the insulation of auxiliary circuits holds.",
    kind: FindingKind::Remark,
    basis: "IEC 62271-1:2017 4.2.2, IEC 60664-1 (from memory)",
    formula: "H <= 2000 m, or auxiliary circuit withstand voltage stated",
    explanation: "Relays, contactors and terminals are built for 2000 m. Above it their clearances count for less. Silent where the \
                  withstand voltage of auxiliary circuits is stated, or no auxiliary part is asked for.",
    check: Check::Case(altitude),
};

/// Low-voltage apparatus is built for altitudes up to here, m (IEC 60664-1, from memory).
const LOW_VOLTAGE_ALTITUDE: f64 = 2000.0;

fn altitude(case: &Case<'_>, findings: &mut Findings) {
    let (Some(altitude), Some(supply)) =
        (case.site.quantity::<Length>(&site::ALTITUDE), case.breaker.statement(&breaker::RATED_SUPPLY_VOLTAGE))
    else {
        return;
    };
    let stated = case.breaker.mentions(&breaker::AUXILIARY_CIRCUIT_WITHSTAND_VOLTAGE);
    if stated || altitude.value.si() <= LOW_VOLTAGE_ALTITUDE * (1.0 + EQUAL) {
        return;
    }
    let message = format!(
        "low-voltage parts are built for 2000 m, the site lies at {}: say what the auxiliary circuits hold",
        altitude.measure
    );
    findings
        .add(&AUXILIARY_ALTITUDE, supply.value, message)
        .label("low-voltage parts in thin air")
        .beside(altitude.statement, "the altitude")
        .advice("add auxiliary circuit withstand voltage with its correction for the altitude");
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const UA: &str = "rated supply voltage";
    const TERMINALS: &str = "supply voltage at the terminals";

    #[test]
    fn preferred_supply_voltages() {
        let finding = Bay::new().set("breaker", UA, "115 V DC").one("supply-voltage-not-preferred");
        assert_eq!(finding.kind, FindingKind::Caution);
        assert_eq!(finding.edits.iter().map(|e| e.text.as_str()).collect::<Vec<_>>(), ["110 V DC", "125 V DC"]);
        for text in ["24 V DC", "250 V DC", "115 V AC", "115 V"] {
            Bay::new().set("breaker", UA, text).silent("supply-voltage-not-preferred");
        }
        let above = Bay::new().set("breaker", "motor supply voltage", "251 V DC").one("supply-voltage-not-preferred");
        assert_eq!(above.edits.len(), 1);
    }

    #[test]
    fn coils_at_the_end_of_the_discharge() {
        let bay = |range: &str| Bay::new().set("breaker", UA, "220 V DC").set("breaker", TERMINALS, range);
        let finding = bay("165 to 242 V").one("coil-voltage");
        assert!(finding.message.contains("75 %") && finding.message.contains("close"), "{}", finding.message);
        assert_eq!(bay("150 to 242 V").of("coil-voltage").len(), 2);
        bay("187 to 242 V").silent("coil-voltage");
        assert_eq!(bay("187 to 250 V").of("coil-voltage").len(), 2);
        bay("165 to 242 V").set("breaker", "closing range", "70 to 110 %").silent("coil-voltage");
        bay("165 to 242 V").set("breaker", "closing range", "160 to 245 V").silent("coil-voltage");
    }

    #[test]
    fn coils_by_ieee_practice() {
        Bay::new()
            .set("tender", "standards", "IEEE C37.04:2018")
            .set("breaker", UA, "125 V DC")
            .set("breaker", TERMINALS, "90 to 140 V")
            .silent("coil-voltage");
        // 93 V is 85 % of 110 V as it is written.
        Bay::new().silent("coil-voltage");
        Bay::new().without("breaker", TERMINALS).silent("coil-voltage");
    }

    #[test]
    fn a_coil_for_each_protection() {
        let bay = |n: &str| Bay::new().set("circuit", "protection systems", n);
        let finding = bay("2").set("breaker", "trip coils", "1").one("trip-coils");
        assert_eq!(finding.edits[0].text, "2");
        let missing = bay("2").without("breaker", "trip coils").one("trip-coils");
        assert_eq!(missing.edits[0].text, "\n    trip coils: 2");
        bay("3").set("breaker", "trip coils", "2").silent("trip-coils");
        bay("1").without("breaker", "trip coils").silent("trip-coils");
        Bay::new().without("circuit", "protection systems").without("breaker", "trip coils").silent("trip-coils");
    }

    #[test]
    fn supplies_of_the_station() {
        let bay = || Bay::new().set("site", "station AC supply", "240 V AC").set("site", "station AC phases", "1");
        let three = bay().set("breaker", "motor supply voltage", "400 V AC").set("breaker", "motor supply phases", "3");
        let found = three.of("supply-mismatch");
        assert_eq!(found.len(), 2);
        bay().set("breaker", "motor supply voltage", "230 V AC").silent("supply-mismatch");
        let battery = Bay::new().set("site", "station battery", "220 V DC").one("supply-mismatch");
        assert_eq!(battery.edits[0].text, "220 V DC");
        // To the neutral of a three-phase supply, and at the edge of the range.
        Bay::new()
            .set("site", "station AC supply", "400 V AC")
            .set("breaker", "heater supply voltage", "230 V AC")
            .silent("supply-mismatch");
        Bay::new().set("site", "station battery", "121 V DC").silent("supply-mismatch");
        Bay::new().set("site", "station battery", "125 V DC").one("supply-mismatch");
        Bay::new().silent("supply-mismatch");
    }

    #[test]
    fn cubicles_in_the_open() {
        let bay = |text: &str| Bay::new().set("breaker", "degree of protection", text);
        for open in ["IP3X", "IP53", "IP44", "NEMA 1", "\"NEMA type 12\""] {
            assert_eq!(bay(open).one("enclosure-protection").kind, FindingKind::Remark, "{open}");
        }
        for closed in ["IP54", "IP55W", "NEMA 4X", "NEMA 3R", "as the drawing shows"] {
            bay(closed).silent("enclosure-protection");
        }
        bay("IP3X").set("site", "installation", "indoor").silent("enclosure-protection");
    }

    #[test]
    fn contacts_of_the_scheme() {
        let bay = |asked: &str| {
            Bay::new().set("breaker", "auxiliary contacts NO", asked).set(
                "breaker",
                "auxiliary contacts needed NO",
                "10",
            )
        };
        assert_eq!(bay("8").one("auxiliary-contacts").edits[0].text, "10");
        bay("10").silent("auxiliary-contacts");
        Bay::new().set("breaker", "auxiliary contacts NO", "8").silent("auxiliary-contacts");
    }

    #[test]
    fn supervision_of_the_trip_circuit() {
        let bay = |current: &str| {
            Bay::new().set("breaker", "trip-circuit supervision current", current).set(
                "breaker",
                "coil pick-up current",
                "100 mA",
            )
        };
        assert!(bay("20 mA").one("supervision-current").message.contains("20 %"));
        bay("10 mA").silent("supervision-current");
        let alone = Bay::new().set("breaker", "trip-circuit supervision current", "5 mA").one("supervision-current");
        assert_eq!(alone.edits[0].text, "\n    coil pick-up current: at least 50 mA");
        Bay::new().set("breaker", "coil pick-up current", "50 mA").one("supervision-current");
        Bay::new().silent("supervision-current");
    }

    #[test]
    fn what_happens_when_the_gas_is_low() {
        let bay = || Bay::new().without("breaker", "low-gas action");
        assert_eq!(bay().one("low-gas-logic").kind, FindingKind::Remark);
        Bay::new().silent("low-gas-logic");
        bay().without("breaker", "minimum functional pressure").silent("low-gas-logic");
    }

    #[test]
    fn auxiliary_parts_in_thin_air() {
        let bay = |altitude: &str| Bay::new().set("site", "altitude", altitude);
        bay("3100 m").one("auxiliary-altitude");
        bay("2000 m").silent("auxiliary-altitude");
        bay("3100 m").set("breaker", "auxiliary circuit withstand voltage", "2.5 kV").silent("auxiliary-altitude");
    }
}
