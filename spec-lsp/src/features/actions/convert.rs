//! The unit of a quantity, changed to the other usual ones. What is written back and forth is the number that stood there.

use firstpole_core::case::Case;
use firstpole_core::particular::{Kind, Particular, SheetKind, Tail, system};
use firstpole_core::quantity::{
    Dimension, ElectricPotential, Frequency, Measure, Physical, Qualifier, Unit, look_up, significant, units_of,
};
use firstpole_core::rules::Policy;
use firstpole_core::sheet::{Sheet, Statement};
use firstpole_core::standards::GAUGE_REFERENCE;
use firstpole_core::{Assessment, Edit, FileId, Span};
use firstpole_grammar::value::{self, Amount, Joint};

use crate::features::spot::{sheet_at, statement_at};

/// How far a converted number may lie from the one that was written, as a share of it.
const APART: f64 = 5e-5;

/// The digits that a converted number has at most.
const MOST_DIGITS: u8 = 12;

/// The quantity at an offset in each other usual unit.
pub fn conversions(assessment: &Assessment, file: FileId, offset: u32) -> Vec<Edit> {
    found(assessment, file, offset).unwrap_or_default()
}

fn found(assessment: &Assessment, file: FileId, offset: u32) -> Option<Vec<Edit>> {
    let sheet = sheet_at(assessment, file, offset)?;
    let (statement, true) = statement_at(assessment, sheet, offset)? else { return None };
    let (Kind::Quantity(kind) | Kind::WordsOrQuantity(_, kind)) = &statement.particular.kind else { return None };
    let reading = statement.quantity()?;
    let text = assessment.sources.text(statement.value);
    let written = value::quantity(text).ok()?;
    let last = written.second.as_ref().map_or(&written.first, |(_, amount)| amount);
    let unit_of = if last.unit.is_empty() { &written.first } else { last };
    let (own, words) = unit_and_words(text, unit_of, kind.dimensions)?;
    let span = Span::new(written.first.span.start, last.span.end);
    if !written.span.touches(offset.checked_sub(assessment.span(statement.value).start)?) {
        return None;
    }
    let place = statement.value.part(span);
    let frequency = frequency(assessment, sheet);
    let measures: Vec<Measure> =
        [Some(reading.measure), reading.second.map(|(_, second)| second)].into_iter().flatten().collect();
    // Two units in one value would both be lost.
    if measures.iter().any(|measure| *measure.unit != *own) {
        return None;
    }
    let joint = match reading.second {
        Some((Joint::Sum, _)) => " + ",
        _ => " to ",
    };
    let edit = |unit: &'static Unit, reference: Option<Qualifier>| {
        let shift = match (words.reference, reference) {
            (Some(Qualifier::Absolute), Some(Qualifier::Gauge)) => -GAUGE_REFERENCE.value().si(),
            (Some(Qualifier::Gauge), Some(Qualifier::Absolute)) => GAUGE_REFERENCE.value().si(),
            _ => 0.0,
        };
        let numbers: Option<Vec<String>> = measures
            .iter()
            .map(|measure| {
                let there = |x: f64| from_si(unit, to_si(own, x, frequency)? + shift, frequency);
                let back = |y: f64| from_si(own, to_si(unit, y, frequency)? - shift, frequency);
                converted(measure.number, measure.decimals, &there, &back)
            })
            .collect();
        let mut text = format!("{} {}", numbers?.join(joint), unit.name);
        for word in reference.map(Qualifier::word).into_iter().chain(words.others.iter().copied()) {
            text.push(' ');
            text.push_str(word);
        }
        Some(Edit { title: format!("write {text}"), place, text })
    };
    let references: Vec<Option<Qualifier>> = match (kind.tail, words.reference) {
        (Tail::PressureReference, Some(own)) => {
            let other = if own == Qualifier::Gauge { Qualifier::Absolute } else { Qualifier::Gauge };
            vec![Some(own), Some(other)]
        }
        (_, own) => vec![own],
    };
    let mut edits: Vec<Edit> = references
        .iter()
        .flat_map(|reference| usual(kind.units, reading.dimension()).into_iter().map(move |unit| (unit, *reference)))
        .filter(|(unit, reference)| **unit != *own || *reference != words.reference)
        .filter_map(|(unit, reference)| edit(unit, reference))
        .collect();
    edits.extend(level(assessment, sheet, statement));
    Some(edits)
}

fn to_si(unit: &Unit, number: f64, frequency: Option<Frequency>) -> Option<f64> {
    if unit.counts_cycles() { frequency.map(|frequency| number / frequency.si()) } else { unit.to_si(number) }
}

fn from_si(unit: &Unit, value: f64, frequency: Option<Frequency>) -> Option<f64> {
    if unit.counts_cycles() { frequency.map(|frequency| value * frequency.si()) } else { unit.from_si(value) }
}

/// The words beside a unit.
struct Words<'a> {
    /// Of a pressure, absolute or gauge.
    reference: Option<Qualifier>,
    /// The others, as they were written; what the spelling of the unit said is written out.
    others: Vec<&'a str>,
}

fn unit_and_words<'a>(text: &'a str, amount: &Amount, dimensions: &[Dimension]) -> Option<(&'static Unit, Words<'a>)> {
    let (spelt, used) = (1..=amount.unit.len().min(3)).rev().find_map(|count| {
        let (first, last) = (amount.unit.first()?, amount.unit.get(count - 1)?);
        let spelling = Span::new(first.start, last.end).of(text).split_whitespace().collect::<Vec<_>>().join(" ");
        Some((look_up(&spelling, dimensions)?, count))
    })?;
    let mut words = Words { reference: None, others: Vec::new() };
    let is_reference = |qualifier| matches!(qualifier, Qualifier::Absolute | Qualifier::Gauge);
    match spelt.qualifier {
        Some(qualifier) if is_reference(qualifier) => words.reference = Some(qualifier),
        Some(qualifier) => words.others.push(qualifier.word()),
        None => {}
    }
    for span in amount.unit.get(used..).unwrap_or(&[]) {
        match Qualifier::read(span.of(text)) {
            Some(qualifier) if is_reference(qualifier) && spelt.unit.dimension == Dimension::Pressure => {
                words.reference = Some(qualifier);
            }
            _ => words.others.push(span.of(text)),
        }
    }
    Some((spelt.unit, words))
}

/// The usual units of a particular: its own, and those of the other community beside them.
fn usual(units: &[&'static str], dimension: Dimension) -> Vec<&'static Unit> {
    const PAIRS: [(&str, &str); 8] = [
        ("kV", "V"),
        ("kA", "A"),
        ("degC", "degF"),
        ("m", "ft"),
        ("mm", "in"),
        ("km", "mi"),
        ("kg", "lb"),
        ("ms", "cycles"),
    ];
    let others = PAIRS.iter().flat_map(|(a, b)| [(a, b), (b, a)]).filter(|(a, _)| units.contains(a)).map(|(_, b)| *b);
    let mut found: Vec<&'static Unit> = Vec::new();
    for name in units.iter().copied().chain(others) {
        let unit = units_of(dimension).find(|unit| unit.name == name);
        found.extend(unit.filter(|unit| !found.contains(unit)));
    }
    found
}

/// The frequency by which cycles count: of the breaker that the sheet is, is for, or of those that stand on it where they agree.
fn frequency(assessment: &Assessment, sheet: &Sheet) -> Option<Frequency> {
    let set = &assessment.set;
    if sheet.kind == SheetKind::System {
        return set.facts(sheet.id).quantity::<Frequency>(&system::FREQUENCY).map(|stated| stated.value);
    }
    let breaker = if sheet.kind == SheetKind::Breaker { Some(sheet.id) } else { sheet.target("for") };
    let breaker = set.sheet(breaker?)?;
    Case::new(set, breaker, &Policy::default()).frequency()
}

/// The number with the fewest digits that stands for the one written, and leads back to it.
fn converted(
    number: f64,
    decimals: u8,
    there: &dyn Fn(f64) -> Option<f64>,
    back: &dyn Fn(f64) -> Option<f64>,
) -> Option<String> {
    candidates(number, decimals, there, back).find(|text| {
        let Ok(value) = text.parse::<f64>() else { return false };
        let first = candidates(value, digits_after_point(text), back, there).next();
        first.and_then(|text| text.parse::<f64>().ok()) == Some(number)
    })
}

fn candidates<'a>(
    number: f64,
    decimals: u8,
    there: &'a dyn Fn(f64) -> Option<f64>,
    back: &'a dyn Fn(f64) -> Option<f64>,
) -> impl Iterator<Item = String> + 'a {
    let last = 10f64.powi(-i32::from(decimals));
    let exact = there(number);
    (1..=MOST_DIGITS).filter_map(move |digits| {
        let text = significant(exact?, digits);
        let again = back(text.parse().ok()?)?;
        let apart = (again - number).abs();
        (apart < last * 0.4999 && apart <= APART * number.abs().max(last)).then_some(text)
    })
}

fn digits_after_point(text: &str) -> u8 {
    text.split_once('.').map_or(0, |(_, fraction)| fraction.len() as u8)
}

/// A fault level as a current and the reverse: S = sqrt3 U Ik, at the voltage that is stated.
fn level(assessment: &Assessment, sheet: &Sheet, statement: &Statement) -> Option<Edit> {
    let reading = statement.quantity()?;
    let plain = reading.second.is_none() && reading.tolerance.is_none() && reading.again.is_empty();
    if !plain || statement.value.block() != sheet.heading.block() {
        return None;
    }
    let facts = assessment.set.facts(sheet.id);
    let root = 3f64.sqrt();
    let (other, text): (&Particular, String) = if statement.states(&system::FAULT_LEVEL) {
        let voltage = reading.at?;
        if facts.mentions(&system::SHORT_CIRCUIT_CURRENT) {
            return None;
        }
        let factor = root * voltage.si?;
        let unit = reading.measure.unit;
        let there = |x: f64| Some(unit.to_si(x)? / factor / 1e3);
        let back = |y: f64| unit.from_si(y * 1e3 * factor);
        let number = converted(reading.measure.number, reading.measure.decimals, &there, &back)?;
        (&system::SHORT_CIRCUIT_CURRENT, reading.shown_with(&format!("{number} kA")))
    } else if statement.states(&system::SHORT_CIRCUIT_CURRENT) {
        if facts.mentions(&system::FAULT_LEVEL) {
            return None;
        }
        let voltage = facts.quantity::<ElectricPotential>(&system::NOMINAL_VOLTAGE)?;
        let factor = root * voltage.value.si();
        let unit = reading.measure.unit;
        let there = |x: f64| Some(unit.to_si(x)? * factor / 1e6);
        let back = |y: f64| unit.from_si(y * 1e6 / factor);
        let number = converted(reading.measure.number, reading.measure.decimals, &there, &back)?;
        let number = format!("{number} MVA at {}", voltage.measure);
        (&system::FAULT_LEVEL, number)
    } else {
        return None;
    };
    let bound = match reading.bound {
        Some(value::Bound::Least) => "at least ",
        Some(value::Bound::Greatest) => "at most ",
        None => "",
    };
    let text = format!("{}: {bound}{text}", other.label);
    let place = statement.label.to(statement.value);
    Some(Edit { title: format!("write {text}"), place, text })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::at_cursor;

    fn told(text: &str) -> Vec<String> {
        let (assessment, at) = at_cursor(text);
        conversions(&assessment, FileId(0), at).into_iter().map(|edit| edit.text).collect()
    }

    fn breaker(line: &str) -> Vec<String> {
        told(&format!("cbspec 1\nsystem S\n    frequency: 60 Hz\nbreaker A on S\n    {line}\n"))
    }

    fn site(line: &str) -> Vec<String> {
        told(&format!("cbspec 1\nsite S\n    {line}\n"))
    }

    /// 1 in = 25.4 mm and 1 ft = 0.3048 m by definition; 1 psi = 6.894757 kPa (NIST SP 811).
    #[test]
    fn usual_units_of_each_dimension() {
        assert!(site("lowest ambient: -4|2 degC").contains(&"-43.6 degF".to_owned()));
        assert!(site("lowest ambient: -43.6| degF").contains(&"-42 degC".to_owned()));
        assert!(site("altitude: 142|0 m").contains(&"4659 ft".to_owned()), "{:?}", site("altitude: 142|0 m"));
        assert!(breaker("rated voltage: 14|5 kV").contains(&"145000 V".to_owned()));
        let pressures = breaker("rated filling pressure: 0.7|0 MPa abs");
        for text in ["7 bar abs", "101.53 psi abs", "0.5987 MPa gauge"] {
            assert!(pressures.contains(&text.to_owned()), "{text}: {pressures:?}");
        }
        assert!(breaker("rated filling pressure: 101.53| psia").contains(&"0.7 MPa abs".to_owned()));
    }

    #[test]
    fn cycles_need_a_frequency() {
        assert!(breaker("opening time: at most 5|0 ms").contains(&"3 cycles".to_owned()));
        assert!(breaker("opening time: at most |3 cycles").contains(&"50 ms".to_owned()));
        let without = told("cbspec 1\nbreaker A\n    opening time: 5|0 ms\n");
        assert!(!without.iter().any(|text| text.contains("cycles")), "{without:?}");
    }

    #[test]
    fn a_range_keeps_both_sides() {
        let found = site("ambient: -2|5 to 40 degC");
        assert!(found.contains(&"-13 to 104 degF".to_owned()), "{found:?}");
    }

    /// 2500 MVA at 110 kV is 2500/(1.7321 x 110) = 13.12 kA.
    #[test]
    fn a_fault_level_is_a_current_at_its_voltage() {
        let found = told("cbspec 1\nsystem S\n    fault level: 25|00 MVA at 110 kV\n");
        assert!(found.iter().any(|text| text.starts_with("short-circuit current: 13.12")), "{found:?}");
        let found = told("cbspec 1\nsystem S\n    nominal voltage: 132 kV\n    short-circuit current: 28.|4 kA\n");
        assert!(found.iter().any(|text| text.starts_with("fault level: 6493")), "{found:?}");
        let found = told("cbspec 1\nsystem S\n    short-circuit current: 28.|4 kA\n");
        assert!(!found.iter().any(|text| text.contains("MVA")), "no voltage, no power: {found:?}");
    }

    #[test]
    fn there_and_back_is_the_same_number() {
        let lines = [
            ("site", "lowest ambient", "degC", "degF"),
            ("site", "altitude", "m", "ft"),
            ("breaker", "rated voltage", "kV", "V"),
            ("breaker", "rated filling pressure", "MPa abs", "psi abs"),
            ("breaker", "rated filling pressure", "MPa abs", "bar gauge"),
            ("breaker", "opening time", "ms", "cycles"),
        ];
        for (sheet, label, own, other) in lines {
            for number in ["0.31", "0.7", "7", "12", "31.5", "145", "1425", "2000.5"] {
                let there = |number: &str, from: &str, to: &str| {
                    let line = format!("{label}: |{number} {from}");
                    let all = if sheet == "site" { site(&line) } else { breaker(&line) };
                    let found = all.iter().find_map(|text| text.strip_suffix(to)).map(|text| text.trim().to_owned());
                    found.unwrap_or_else(|| panic!("{line}: {all:?}"))
                };
                let over = there(number, own, other);
                assert_eq!(there(&over, other, own), number, "{label} {number} {own} by {over} {other}");
            }
        }
    }
}
