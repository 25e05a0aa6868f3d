//! Particulars of a breaker: tests.

use crate::particular::{Kind, QuantityKind, particulars};
use crate::quantity::Dimension;

particulars! { Breaker, "tests";
    TYPE_TESTS = "type tests" {
        wordings: ["design tests"],
        kind: Kind::Texts,
        sense: Set,
        carried: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Reports that are asked for.",
    }
    AGE_OF_TYPE_TEST_REPORTS = "age of type test reports" {
        wordings: ["report age"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["years"])),
        sense: AtMost,
        carried: true,
        basis: "practice",
        meaning: "How old they may be.",
    }
    TESTS_TO_BE_REPEATED = "tests to be repeated" {
        wordings: ["special tests"],
        kind: Kind::Texts,
        sense: Set,
        carried: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "On the breaker bought.",
    }
    ROUTINE_TESTS = "routine tests" {
        wordings: ["production tests"],
        kind: Kind::Texts,
        sense: Set,
        carried: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "On every breaker.",
    }
    SITE_TESTS = "site tests" {
        wordings: ["commissioning tests"],
        kind: Kind::Texts,
        sense: Set,
        carried: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "After erection.",
    }
    WITNESSED_TESTS = "witnessed tests" {
        kind: Kind::YesNo,
        sense: Set,
        carried: true,
        basis: "practice",
        meaning: "The buyer attends.",
    }
}
