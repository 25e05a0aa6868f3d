//! Quantities there and back: written, read, shown, and read again.

#![allow(clippy::expect_used, clippy::indexing_slicing, reason = "a test fails by panicking")]

use firstpole_core::particular::{Kind, SheetKind, declared};
use firstpole_core::quantity::{Dimension, Measure, look_up, units_of};
use firstpole_core::sheet::{Reading, Statement};
use firstpole_core::{Assessor, Sources};
use proptest::prelude::*;

/// The statement of `value` under `label`, and the rules that had something to say while it was read.
fn read(sheet: &str, label: &str, value: &str) -> (Option<Statement>, Vec<&'static str>) {
    let text = format!("cbspec 1\n{sheet} X\n    {label}: {value}\n");
    let assessment = Assessor::standard().assess(&Sources::of("x.cbspec", text.as_str()));
    let statement =
        assessment.set.sheets().next().and_then(|sheet| sheet.statements.first()).map(|s| Statement::clone(s));
    let reading =
        ["unreadable-line", "unreadable-value", "decimal-comma", "unit-missing", "unit-mismatch", "unknown-unit"];
    let rules = assessment.findings().iter().map(|f| f.rule).filter(|rule| reading.contains(rule)).collect();
    (statement, rules)
}

fn measure(statement: &Statement) -> Measure {
    match &statement.reading {
        Reading::Quantity(quantity) => quantity.measure,
        other => panic!("no quantity: {other:?}"),
    }
}

/// One particular of each dimension, with its sheet and label.
fn bearers() -> Vec<(Dimension, &'static str, &'static str)> {
    let mut found: Vec<(Dimension, &'static str, &'static str)> = Vec::new();
    for sheet in [SheetKind::Breaker, SheetKind::System, SheetKind::Site, SheetKind::Circuit, SheetKind::Infeed] {
        for particular in declared(sheet) {
            let Kind::Quantity(kind) = &particular.kind else { continue };
            let Some(dimension) = kind.dimensions.first() else { continue };
            // A bound to rms or peak, and what needs words behind it, would ask for those words.
            if kind.dimensions.len() == 1 && !found.iter().any(|(d, ..)| d == dimension) {
                found.push((*dimension, sheet.word(), particular.label));
            }
        }
    }
    found
}

#[test]
fn every_dimension_has_a_particular_to_read_it_by() {
    let bearers = bearers();
    assert!(bearers.len() >= 24, "{bearers:?}");
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 256, ..ProptestConfig::default() })]

    /// Written in any unit with any number of decimals, a quantity is read as it was written, and shows itself so that it is
    /// read again as the same.
    #[test]
    fn written_read_shown_and_read_again(
        bearer in any::<prop::sample::Index>(),
        unit in any::<prop::sample::Index>(),
        whole in 0u32..99_999,
        decimals in 0usize..4,
    ) {
        let bearers = bearers();
        let (dimension, sheet, label) = bearers[bearer.index(bearers.len())];
        let units: Vec<_> = units_of(dimension).filter(|unit| !unit.counts_cycles()).collect();
        let unit = units[unit.index(units.len())];
        let number = f64::from(whole) / 10f64.powi(decimals as i32);
        let written = format!("{number:.decimals$} {}", unit.name);
        let (statement, rules) = read(sheet, label, &written);
        prop_assert!(rules.is_empty(), "{label}: {written}: {rules:?}");
        let first = measure(&statement.expect("a statement"));
        prop_assert_eq!(first.number, written.split(' ').next().and_then(|n| n.parse().ok()).unwrap_or(f64::NAN));
        prop_assert_eq!(first.unit.name, unit.name);
        let shown = first.to_string();
        let (again, rules) = read(sheet, label, &shown);
        prop_assert!(rules.is_empty(), "{label}: {shown}: {rules:?}");
        prop_assert_eq!(measure(&again.expect("a statement")), first);
    }

    /// A comma is refused whatever stands around it, and the value is then unknown.
    #[test]
    fn a_comma_is_always_refused(whole in 0u32..9999, fraction in 0u32..9999) {
        let written = format!("{whole},{fraction} kV");
        let (statement, rules) = read("breaker", "rated voltage", &written);
        prop_assert_eq!(rules, vec!["decimal-comma"]);
        prop_assert_eq!(statement.expect("a statement").reading, Reading::Unknown);
    }

    /// Digits grouped in threes by a blank, or by a narrow one, are the same number.
    #[test]
    fn grouped_digits_are_the_same_number(number in 1000u32..9_999_999, narrow in any::<bool>()) {
        let digits = number.to_string();
        let blank = if narrow { '\u{202f}' } else { ' ' };
        let mut grouped = String::new();
        for (at, digit) in digits.chars().enumerate() {
            if at > 0 && (digits.len() - at) % 3 == 0 {
                grouped.push(blank);
            }
            grouped.push(digit);
        }
        let (statement, rules) = read("breaker", "rated voltage", &format!("{grouped} V"));
        prop_assert!(rules.is_empty(), "{grouped}: {rules:?}");
        prop_assert_eq!(measure(&statement.expect("a statement")).number, f64::from(number));
    }

    /// Every unit there and back.
    #[test]
    fn units_there_and_back(dimension in any::<prop::sample::Index>(), number in -1e6f64..1e6) {
        let dimension = Dimension::ALL[dimension.index(Dimension::ALL.len())];
        for unit in units_of(dimension).filter(|unit| !unit.counts_cycles()) {
            let back = unit.to_si(number).and_then(|si| unit.from_si(si)).expect("a scale");
            prop_assert!((back - number).abs() <= 1e-9 * number.abs().max(1e3), "{}: {number} {back}", unit.name);
            prop_assert_eq!(look_up(unit.name, &[dimension]).expect("its own name").unit.name, unit.name);
        }
    }

    /// Three significant digits in the author's unit are within half a unit of the third digit.
    #[test]
    fn shown_in_the_unit_of_the_author(number in 1f64..99_999.0, other in 1e3f64..1e6) {
        for unit in units_of(Dimension::Voltage) {
            let author = Measure::new(number, 1, unit);
            let shown = author.show_like(other);
            let (digits, name) = shown.split_once(' ').expect("number and unit");
            prop_assert_eq!(name, unit.name);
            let back = unit.to_si(digits.parse().expect("a number")).expect("a scale");
            prop_assert!((back - other).abs() <= 0.0051 * other, "{shown} for {other}");
        }
    }
}
