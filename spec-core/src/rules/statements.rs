//! Rules on single statements: said twice, in two units, without a basis, left open, out of order or of size.

use super::{Check, EQUAL, Policy, Rule};
use crate::case::{Case, needed_for};
use crate::finding::{FindingKind, Findings};
use crate::particular::{Kind, Limit, Particular, SheetKind, Tail, breaker, site, tender};
use crate::quantity::{Dimension, Measure, Physical, Qualifier, ThermodynamicTemperature};
use crate::sheet::{About, Facts, QuantityReading, Reading, Set, Sheet, Statement};
use crate::standards::GAUGE_REFERENCE;

/// The rules of this subject.
pub static ALL: &[&Rule] =
    &[&STATED_TWICE, &DUAL_UNITS_DISAGREE, &BASIS_MISSING, &OPEN_POINT, &BOUNDS_ORDER, &MAGNITUDE, &FROM_DUTY_OPEN];

/// One quantity has one value.
pub static STATED_TWICE: Rule = Rule {
    name: "stated-twice",
    title: "One quantity has one value in its sheet, and a class of one letter one grade.",
    kind: FindingKind::Contradiction,
    basis: "common practice, no source",
    formula: "all statements of one label in one sheet are equal",
    explanation: "Of two values nothing is chosen silently: the checks take the more onerous one, and both places are shown. Equal \
                  values in two units are no trouble, and a minimum and a maximum of one label are two bounds. A value that \
                  replaces one taken over through like is meant to.",
    check: Check::Sheet(twice),
};

fn twice(_: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    for (at, second) in sheet.statements.iter().enumerate() {
        let earlier = sheet.statements.get(..at).unwrap_or(&[]);
        let first = earlier.iter().find(|first| {
            first.particular.is(second.particular) && first.about == second.about && first.limit == second.limit
        });
        let Some(first) = first.filter(|first| !agree(&first.reading, &second.reading)) else { continue };
        let message = format!("{} is stated twice in {}, with two values", second.particular.label, sheet.title());
        findings
            .add(&STATED_TWICE, second.value, message)
            .label("the second value")
            .related(first.value, "the first value")
            .advice("keep one place, and refer to it from the other; until then the more onerous value is checked");
    }
    for statement in &sheet.statements {
        let Reading::Classes(classes) = &statement.reading else { continue };
        for (at, class) in classes.iter().enumerate() {
            let earlier =
                classes.get(..at).unwrap_or(&[]).iter().find(|c| c.letter == class.letter && c.grade != class.grade);
            if let Some(first) = earlier {
                findings
                    .add(&STATED_TWICE, class.place, format!("the classes {first} and {class} are both asked for"))
                    .label("a second grade of this letter")
                    .stated(class.to_string())
                    .related(first.place, "the first");
            }
        }
    }
}

/// Whether two readings say the same. What could not be read is not held against anything.
fn agree(first: &Reading, second: &Reading) -> bool {
    match (first, second) {
        (Reading::Unknown, _) | (_, Reading::Unknown) => true,
        (Reading::Quantity(a), Reading::Quantity(b)) => {
            // Two bounds of one quantity are not two values.
            if a.bound.is_some() && b.bound.is_some() && a.bound != b.bound {
                return true;
            }
            let same = |a: &Measure, b: &Measure| match (a.si, b.si) {
                (Some(x), Some(y)) => (x - y).abs() <= EQUAL * x.abs().max(y.abs()).max(f64::MIN_POSITIVE),
                _ => a.number == b.number && a.unit == b.unit,
            };
            let reference = |q: &QuantityReading| q.absolute().map(|p| p.pressure.si());
            match (reference(a), reference(b)) {
                (Some(x), Some(y)) => (x - y).abs() <= EQUAL * x.abs(),
                _ => same(a.lower(), b.lower()) && same(a.upper(), b.upper()),
            }
        }
        (Reading::List(a), Reading::List(b)) => a.iter().map(|i| &i.text).eq(b.iter().map(|i| &i.text)),
        (Reading::Classes(a), Reading::Classes(b)) => {
            a.iter().map(ToString::to_string).eq(b.iter().map(ToString::to_string))
        }
        (Reading::Sequence(a), Reading::Sequence(b)) => a.to_string() == b.to_string(),
        (Reading::Gas(a), Reading::Gas(b)) => a.iter().map(|m| &m.portions).eq(b.iter().map(|m| &m.portions)),
        _ => first == second,
    }
}

/// Two units of one statement agree.
pub static DUAL_UNITS_DISAGREE: Rule = Rule {
    name: "dual-units-disagree",
    title: "A value said again in brackets in another unit is the same value.",
    kind: FindingKind::Contradiction,
    basis: "arithmetic; conversion factors of the SI",
    formula: "within 1 %, or half a unit of the last digit written; 0.5 K for temperatures",
    explanation: "Gauge pressures agree if they do at 101.3 kPa, at 100 kPa, or at the pressure of the site's air. Cycles and \
                  milliseconds are compared by cycles-disagree, which knows the frequency.",
    check: Check::Sheet(dual),
};

/// The flat reference that documents of the trade often use for gauge pressures, Pa (common practice, no source).
const FLAT_REFERENCE: f64 = 100_000.0;

fn dual(set: &Set, sheet: &Sheet, policy: &Policy, findings: &mut Findings) {
    let air = air_of(set, sheet);
    for statement in &sheet.statements {
        let Some(quantity) = statement.quantity() else { continue };
        for again in &quantity.again {
            for (first, second) in pairs(quantity, again) {
                compare(findings, policy, statement, (quantity, first), (again, second), air);
            }
        }
    }
}

/// The values of two readings that stand for each other: of ranges both ends.
fn pairs<'a>(first: &'a QuantityReading, second: &'a QuantityReading) -> Vec<(&'a Measure, &'a Measure)> {
    if first.is_range() && second.is_range() {
        vec![(first.lower(), second.lower()), (first.upper(), second.upper())]
    } else {
        vec![(&first.measure, &second.measure)]
    }
}

/// The pressure of the air at the site of a breaker, Pa, where it is stated.
fn air_of(set: &Set, sheet: &Sheet) -> Option<f64> {
    let site = set.sheet(sheet.target("at")?)?;
    set.facts(site.id).quantity::<crate::quantity::Pressure>(&site::ATMOSPHERIC_PRESSURE).map(|s| s.value.si())
}

fn compare(
    findings: &mut Findings,
    policy: &Policy,
    statement: &Statement,
    (first_reading, first): (&QuantityReading, &Measure),
    (second_reading, second): (&QuantityReading, &Measure),
    air: Option<f64>,
) {
    let (Some(a), Some(b)) = (first.si, second.si) else { return };
    if first.dimension() == Dimension::Time && first.unit.counts_cycles() != second.unit.counts_cycles() {
        return;
    }
    let relative = if first.dimension() == Dimension::Temperature {
        policy.dual_temperature_tolerance
    } else {
        policy.dual_tolerance * a.abs()
    };
    let slack = (relative.max(first.half_last_digit()).max(second.half_last_digit())) * (1.0 + 1e-9);
    let gauge = |reading: &QuantityReading| reading.is(Qualifier::Gauge);
    let said = |reading: &QuantityReading| gauge(reading) || reading.is(Qualifier::Absolute);
    let is_pressure = first.dimension() == Dimension::Pressure;
    // Each pressure of the air that the trade refers a gauge to; without a gauge on one side only, they cancel.
    let references = [Some(GAUGE_REFERENCE.value().si()), Some(FLAT_REFERENCE), air];
    let fits = |reference: f64| {
        let lift = |reading: &QuantityReading, value: f64| if gauge(reading) { value + reference } else { value };
        (lift(first_reading, a) - lift(second_reading, b)).abs() <= slack
    };
    let one_bare = is_pressure && said(first_reading) != said(second_reading);
    // A bare pressure beside one with its reference is whichever of the two it agrees as.
    let bare_fits =
        one_bare && references.iter().flatten().any(|r| [a + r - b, a - b, a - b - r].iter().any(|d| d.abs() <= slack));
    if references.iter().flatten().any(|r| fits(*r)) || bare_fits {
        return;
    }
    let reference = GAUGE_REFERENCE.value().si();
    let lift = if is_pressure && gauge(first_reading) && !gauge(second_reading) {
        reference
    } else if is_pressure && gauge(second_reading) && !gauge(first_reading) {
        -reference
    } else {
        0.0
    };
    let text = second_reading.shown_with(&second.show_like(a + lift));
    let message = format!(
        "{} is {text}, not {}",
        first_reading.shown_with(&first.to_string()),
        second_reading.shown_with(&second.to_string())
    );
    findings
        .add(&DUAL_UNITS_DISAGREE, second_reading.place, message)
        .label("does not agree with the value before it")
        .stated(second)
        .needed(text.as_str())
        .related(first_reading.place, format!("{} in the other unit", statement.particular.label))
        .replace_by(text);
}

/// The words that belong to a value are there.
pub static BASIS_MISSING: Rule = Rule {
    name: "basis-missing",
    title: "A value whose meaning hangs on a word has that word.",
    kind: FindingKind::Omission,
    basis: "IEC 60815:1986 against :2008; IEC 62271-1:2017 5.9 (from memory)",
    formula: "specific creepage: phase-to-phase or phase-to-earth; supply voltage: DC or AC",
    explanation: "31 mm/kV is class e on the phase-to-phase voltage and below class c on the phase-to-earth voltage. A supply of \
                  110 V may be a battery or a transformer. Whether a pressure is absolute or gauge is asked by pressure-reference.",
    check: Check::Sheet(basis),
};

fn basis(_: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    for statement in sheet.statements.iter().filter(|s| s.about == About::Value) {
        let (Some(reading), Kind::Quantity(kind)) = (statement.quantity(), &statement.particular.kind) else {
            continue;
        };
        let words: [Qualifier; 2] = match kind.tail {
            Tail::DividingVoltage => [Qualifier::PhaseToPhase, Qualifier::PhaseToEarth],
            Tail::Supply => [Qualifier::Dc, Qualifier::Ac],
            _ => continue,
        };
        if words.iter().any(|word| reading.is(*word)) {
            continue;
        }
        let message =
            format!("{} {}: {} or {}?", statement.particular.label, reading.measure, words[0].word(), words[1].word());
        let finding = findings.add(&BASIS_MISSING, reading.place, message);
        finding.label(format!("{} or {}?", words[0].word(), words[1].word())).stated(&reading.measure);
        for word in words {
            let text = format!("{} {}", reading.measure, word.word());
            finding.edit(format!("write {text}"), reading.place, text);
        }
    }
}

/// No value is left open without saying so.
pub static OPEN_POINT: Rule = Rule {
    name: "open-point",
    title: "No value is left open; an issued tender has none.",
    kind: FindingKind::Omission,
    basis: "common practice, no source: the same is demanded of bidders",
    formula: "no empty value, later, as per IEC, refer drawing, to be confirmed, TBC, TBA, ?",
    explanation: "An omission while the tender is a draft or for review, a contradiction once its status is issued (or with \
                  --issued). A point with an owner and a date, open point \"who, until when\", stays an omission. The rules that need \
                  the value are silent until it is there.",
    check: Check::Sheet(open),
};

fn open(set: &Set, sheet: &Sheet, policy: &Policy, findings: &mut Findings) {
    // What is missing of a deviation is told by deviation-incomplete.
    if sheet.kind == SheetKind::Deviation {
        return;
    }
    for statement in &sheet.statements {
        let Reading::Open(who) = &statement.reading else { continue };
        let owned = who.as_ref().is_some_and(|who| !who.trim().is_empty());
        let label = statement.particular.label;
        let message = match who.as_ref().filter(|_| owned) {
            Some(who) => format!("{label} is an open point: {who}"),
            None => format!("{label} has no value"),
        };
        let place = if statement.value.is_empty() { statement.label } else { statement.value };
        let finding = findings.add(&OPEN_POINT, place, message);
        finding.label(if owned { "open" } else { "no value" });
        if issued(set, sheet, policy) && !owned {
            finding.kind(FindingKind::Contradiction).advice("the tender is issued: state the value");
        } else if !owned {
            finding.advice("state the value, or write open point \"who, until when\"");
        }
    }
}

fn issued(set: &Set, sheet: &Sheet, policy: &Policy) -> bool {
    let status = set.in_reach(sheet.file(), SheetKind::Tender).next().and_then(|tender_sheet| {
        let facts = set.facts(tender_sheet.id);
        facts.word(&tender::STATUS).map(|(word, _)| word)
    });
    policy.issued || status == Some("issued")
}

/// Bounds are in order.
pub static BOUNDS_ORDER: Rule = Rule {
    name: "bounds-order",
    title: "A lower bound is below its upper bound, and no label of cold or heat is swapped.",
    kind: FindingKind::Contradiction,
    basis: "common practice, no source; IEC 62271-1:2017 4.1 (from memory)",
    formula: "least < greatest; lowest ambient < highest ambient; lowest ambient < 40 degC",
    explanation: "A range whose first value is the greater, a minimum above the maximum of the same label, a lowest ambient \
                  temperature that is not below the highest one or that is hotter than the standard's maximum: two lines or two \
                  labels were swapped.",
    check: Check::Sheet(bounds),
};

/// The highest ambient temperature of normal service, K (IEC 62271-1 4.1, from memory).
const NORMAL_HIGHEST: f64 = 313.15;

fn bounds(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    for statement in sheet.statements.iter().filter(|s| s.about == About::Value) {
        let Some(reading) = statement.quantity() else { continue };
        if let (true, Some((_, second))) = (reading.is_range(), reading.second)
            && second.si < reading.measure.si
        {
            let message = format!("this range begins with the greater value: {second} to {} is meant", reading.measure);
            let text = format!("{second} to {}", reading.measure);
            findings.add(&BOUNDS_ORDER, reading.place, message).label("greater value first").edit(
                format!("write {text}"),
                reading.place,
                text,
            );
        }
    }
    let facts = set.facts(sheet.id);
    for statement in &sheet.statements {
        opposite_bounds(facts, statement, findings);
    }
    if sheet.kind == SheetKind::Site {
        ambients(facts, &site::LOWEST_AMBIENT, &site::HIGHEST_AMBIENT, findings);
    }
    if sheet.kind == SheetKind::Breaker {
        ambients(facts, &breaker::LOWEST_SERVICE_TEMPERATURE, &breaker::HIGHEST_SERVICE_TEMPERATURE, findings);
    }
}

/// A minimum that is above the maximum of the same label.
fn opposite_bounds(facts: &Facts, statement: &Statement, findings: &mut Findings) {
    let Some(reading) = statement.quantity() else { return };
    if reading.is_range() || !reading.bounds(Limit::Least, statement.limit) {
        return;
    }
    let greatest = facts.all(statement.particular).find_map(|other| {
        let upper = other.quantity().filter(|q| !q.is_range() && q.bounds(Limit::Greatest, other.limit))?;
        Some((upper.measure, other))
    });
    let Some((upper, other)) = greatest else { return };
    if let (Some(least), Some(most)) = (reading.measure.si, upper.si)
        && least > most
    {
        let message = format!("at least {} and at most {upper} cannot both hold", reading.measure);
        findings
            .add(&BOUNDS_ORDER, statement.value, message)
            .label("above the upper bound")
            .stated(&reading.measure)
            .beside(other, "the upper bound");
    }
}

fn ambients(facts: &Facts, low: &'static Particular, high: &'static Particular, findings: &mut Findings) {
    let Some(lowest) = facts.quantity::<ThermodynamicTemperature>(low) else { return };
    let highest = facts.quantity::<ThermodynamicTemperature>(high);
    let above_highest = highest.as_ref().filter(|highest| lowest.value.si() >= highest.value.si());
    if lowest.value.si() < NORMAL_HIGHEST && above_highest.is_none() {
        return;
    }
    let message = match above_highest {
        Some(highest) => format!(
            "{} {} is not below {} {}: were the two swapped?",
            low.label, lowest.measure, high.label, highest.measure
        ),
        None => {
            format!("{} {} is hotter than the standard's maximum: was the label swapped?", low.label, lowest.measure)
        }
    };
    let finding = findings.add(&BOUNDS_ORDER, lowest.place(), message);
    finding.label("not a lowest temperature").stated(&lowest.measure);
    if let Some(highest) = above_highest {
        finding.beside(highest.statement, "the highest temperature");
    }
}

/// A value is of a size that its particular can have.
pub static MAGNITUDE: Rule = Rule {
    name: "magnitude",
    title: "A value is of a size that its particular can have.",
    kind: FindingKind::Contradiction,
    basis: "common practice, no source: bands wide enough for every apparatus",
    formula: "least <= value <= greatest of the particular's band",
    explanation: "Catches a unit slipped by a thousand: a closing time of 100 s, a rated voltage of 145 V. The bands are wide and say \
                  nothing of what is reasonable. Where the same number in another unit of the label falls into the band, that is \
                  the repair.",
    check: Check::Sheet(magnitude),
};

/// Bands in SI base units, of the particulars in which a slip of the unit is known to happen (common practice, no source).
static BANDS: &[(&Particular, f64, f64)] = &[
    (&breaker::RATED_VOLTAGE, 1e3, 1.3e6),
    (&crate::particular::system::NOMINAL_VOLTAGE, 1e3, 1.2e6),
    (&crate::particular::system::HIGHEST_VOLTAGE, 1e3, 1.3e6),
    (&breaker::RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE, 10e3, 4e6),
    (&breaker::RATED_SHORT_DURATION_POWER_FREQUENCY_WITHSTAND_VOLTAGE, 3e3, 2e6),
    (&breaker::RATED_CONTINUOUS_CURRENT, 50.0, 50e3),
    (&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT, 1e3, 300e3),
    (&crate::particular::system::SHORT_CIRCUIT_CURRENT, 100.0, 300e3),
    (&breaker::RATED_SHORT_CIRCUIT_MAKING_CURRENT, 2e3, 900e3),
    (&breaker::DC_TIME_CONSTANT, 5e-3, 1.0),
    (&crate::particular::system::DC_TIME_CONSTANT, 1e-3, 1.0),
    (&breaker::OPENING_TIME, 1e-3, 0.5),
    (&breaker::BREAK_TIME, 5e-3, 0.5),
    (&breaker::CLOSING_TIME, 5e-3, 2.0),
    (&breaker::RATED_DURATION_OF_SHORT_CIRCUIT, 0.05, 60.0),
    (&breaker::RATED_FILLING_PRESSURE, 1e4, 5e6),
    (&breaker::CREEPAGE_DISTANCE, 0.02, 50.0),
    (&crate::particular::system::FREQUENCY, 10.0, 100.0),
    (&breaker::RATED_FREQUENCY, 10.0, 100.0),
    (&site::ALTITUDE, -500.0, 6000.0),
    (&site::LOWEST_AMBIENT, 193.15, 343.15),
    (&site::HIGHEST_AMBIENT, 233.15, 353.15),
];

fn magnitude(_: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    for statement in sheet.statements.iter().filter(|s| s.about == About::Value) {
        let Some((_, least, greatest)) = BANDS.iter().find(|(particular, _, _)| particular.is(statement.particular))
        else {
            continue;
        };
        let Some(reading) = statement.quantity() else { continue };
        for measure in [reading.lower(), reading.upper()] {
            let Some(value) = measure.si.filter(|value| value < least || value > greatest) else { continue };
            let Kind::Quantity(kind) = &statement.particular.kind else { continue };
            let meant = kind
                .dimensions
                .iter()
                .flat_map(|d| crate::quantity::units_of(*d))
                .find(|unit| unit.to_si(measure.number).is_some_and(|si| (*least..=*greatest).contains(&si)));
            let shown = Measure::from_si(value, measure.dimension());
            let label = statement.particular.label;
            let message = match meant {
                Some(unit) => format!("{label} {measure}: {}?", unit.name),
                None => format!("{label} {measure} ({shown}) is no value that it can have"),
            };
            let finding = findings.add(&MAGNITUDE, reading.place, message);
            finding.label("of another size").stated(measure);
            if let Some(unit) = meant {
                let text = format!("{} {}", crate::quantity::significant(measure.number, 6), unit.name);
                finding.edit(format!("write {text}"), reading.place, text);
            }
            break;
        }
    }
}

/// What is left to the duty can be chosen from it.
pub static FROM_DUTY_OPEN: Rule = Rule {
    name: "from-duty-open",
    title: "What is left to the duty can be chosen from it.",
    kind: FindingKind::Omission,
    basis: "the language, edition 1",
    formula: "the duty says enough for the smallest standard value that meets it",
    explanation: "from duty asks the checker for the smallest standard value that meets the duty. Where the duty does not say enough, \
                  or the value is not one that the checker chooses, nothing is guessed, and the rules that need it are silent.",
    check: Check::Case(from_duty_open),
};

fn from_duty_open(case: &Case<'_>, findings: &mut Findings) {
    for statement in case.breaker.statements().iter().filter(|s| s.reading == Reading::FromDuty) {
        let label = statement.particular.label;
        let (message, advice) = match needed_for(statement.particular) {
            Some(needed) => (
                format!("{label} cannot be chosen: the duty does not say enough"),
                format!("it needs {needed}; or state the value"),
            ),
            None => (format!("{label} is not chosen from the duty yet"), "state the value".to_owned()),
        };
        findings.add(&FROM_DUTY_OPEN, statement.value, message).label("no value").advice(advice);
    }
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::Policy;
    use crate::rules::testing::Bay;

    #[test]
    fn two_values_of_one_label() {
        let bay = Bay::new().and("    load: 1200 A\n");
        let finding = bay.one("stated-twice");
        assert_eq!(finding.related.len(), 1);
        Bay::new().and("    load: 1.15 kA\n").silent("stated-twice");
        Bay::new().and("    load: 1151 A\n").one("stated-twice");
        Bay::new().set("breaker", "minimum break time", "20 ms").silent("stated-twice");
        Bay::new().set("breaker", "classes", "C1, C2, M2").one("stated-twice");
        Bay::new().set("breaker", "classes", "C2, C2, M2").silent("stated-twice");
    }

    /// 80 psig is 6.5 bar abs, not 5.5.
    #[test]
    fn units_that_disagree() {
        let filling = |text: &str| Bay::new().set("breaker", "rated filling pressure", text);
        let finding = filling("80 psig (5.5 bar abs)").one("dual-units-disagree");
        assert_eq!(finding.edits[0].text, "6.53 bar abs");
        for good in [
            "80 psig (6.53 bar abs)",
            "80 psig (6.52 bar abs)",
            "80 psig (5.5 bar gauge)",
            "0.6 MPa abs (87 psi)",
            "6 bar (0.6 MPa abs)",
        ] {
            filling(good).silent("dual-units-disagree");
        }
        let altitude = |text: &str| Bay::new().set("site", "altitude", text);
        altitude("1312 ft (400 m)").silent("dual-units-disagree");
        altitude("1000 ft (400 m)").one("dual-units-disagree");
    }

    #[test]
    fn temperatures_agree_within_half_a_kelvin() {
        let hottest = |text: &str| Bay::new().set("site", "highest ambient", text);
        hottest("40 degC (104 degF)").silent("dual-units-disagree");
        hottest("35 degC (95 degF)").silent("dual-units-disagree");
        hottest("40.0 degC (105.0 degF)").one("dual-units-disagree");
        hottest("40.0 degC (104.8 degF)").silent("dual-units-disagree");
    }

    #[test]
    fn words_that_belong_to_a_value() {
        let finding = Bay::new().set("breaker", "rated supply voltage", "110 V").one("basis-missing");
        assert_eq!(finding.edits[0].text, "110 V DC");
        Bay::new().silent("basis-missing");
        let creepage = |text: &str| Bay::new().set("breaker", "specific creepage distance", text);
        creepage("31 mm/kV").one("basis-missing");
        creepage("31 mm/kV phase-to-phase").silent("basis-missing");
        Bay::new().set("breaker", "USCD", "53.7 mm/kV").silent("basis-missing");
    }

    #[test]
    fn open_points_block_an_issued_tender() {
        for open in ["later", "as per IEC", "TBC", "?", "refer drawing", ""] {
            let bay = Bay::new().set("breaker", "break time", open);
            assert_eq!(bay.one("open-point").kind, FindingKind::Omission, "{open}");
            let issued = bay.clone().set("tender", "status", "issued").one("open-point");
            assert_eq!(issued.kind, FindingKind::Contradiction, "{open}");
            let asked = bay.findings_with(Policy { issued: true, ..Policy::default() });
            assert!(asked.iter().any(|f| f.rule == "open-point" && f.kind == FindingKind::Contradiction));
        }
        let owned = Bay::new()
            .set("breaker", "break time", "open point \"protection, until May\"")
            .set("tender", "status", "issued");
        assert_eq!(owned.one("open-point").kind, FindingKind::Omission);
        Bay::new().silent("open-point");
    }

    #[test]
    fn swapped_bounds() {
        let finding = Bay::new().set("breaker", "opening time", "30 to 25 ms").one("bounds-order");
        assert_eq!(finding.edits[0].text, "25 ms to 30 ms");
        Bay::new().silent("bounds-order");
        Bay::new().set("site", "lowest ambient", "45 degC").one("bounds-order");
        Bay::new().set("site", "lowest ambient", "39.9 degC").silent("bounds-order");
        Bay::new().set("site", "highest ambient", "-30 degC").one("bounds-order");
        Bay::new()
            .set("breaker", "minimum closing time", "60 ms")
            .set("breaker", "maximum closing time", "50 ms")
            .one("bounds-order");
        Bay::new()
            .set("breaker", "minimum closing time", "40 ms")
            .set("breaker", "maximum closing time", "50 ms")
            .silent("bounds-order");
    }

    #[test]
    fn what_the_duty_says_enough_for_is_chosen() {
        const ISC: &str = "rated short-circuit breaking current";
        let chosen = Bay::new()
            .set("breaker", ISC, "from duty")
            .set("breaker", "rated short-circuit making current", "from duty")
            .set("breaker", "rated voltage", "from duty")
            .set("breaker", "rated continuous current", "from duty")
            .set("breaker", "first-pole-to-clear factor", "from duty")
            .set("breaker", "rated short-time withstand current", "from duty")
            .set("breaker", "rated duration of short-circuit", "1 s");
        let grave: Vec<_> = chosen.findings().into_iter().filter(|f| f.kind < FindingKind::Excess).collect();
        assert!(grave.is_empty(), "{grave:#?}");
        let open = Bay::new().set("breaker", ISC, "from duty").without("system", "short-circuit current");
        let open = open.without("system", "single-phase short-circuit current");
        assert!(open.one("from-duty-open").advice.expect("advice").contains("short-circuit current of the system"));
        Bay::new().set("breaker", "T100 TRV peak", "from duty").one("from-duty-open");
        Bay::new().silent("from-duty-open");
    }

    #[test]
    fn a_unit_slipped_by_a_thousand() {
        let finding = Bay::new().set("breaker", "closing time", "100 s").one("magnitude");
        assert_eq!(finding.edits[0].text, "100 ms");
        assert_eq!(Bay::new().set("breaker", "rated voltage", "145 V").one("magnitude").edits[0].text, "145 kV");
        Bay::new().silent("magnitude");
        Bay::new().set("breaker", "closing time", "2 s").silent("magnitude");
        Bay::new().set("breaker", "closing time", "2.1 s").one("magnitude");
    }
}
