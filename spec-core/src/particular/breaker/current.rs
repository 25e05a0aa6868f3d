//! Particulars of a breaker: current.

use crate::particular::{Kind, QuantityKind, Tail, particulars};
use crate::quantity::{Dimension, Qualifier};

particulars! { Breaker, "current";
    RATED_CONTINUOUS_CURRENT = "rated continuous current" {
        wordings: ["rated normal current", "continuous current"],
        symbols: ["Ir"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 5.5, IEEE C37.04 (memory)",
        meaning: "Carried for ever at 40 degC.",
    }
    OVERLOAD_CURRENT = "overload current" {
        wordings: ["emergency current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "Current above Ir for a limited time.",
    }
    OVERLOAD_DURATION = "overload duration" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["h", "min"])),
        sense: AtLeast,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "How long.",
    }
    OVERLOAD_PRE_LOAD = "overload pre-load" {
        wordings: ["load before the overload"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current, Dimension::Share], &["A", "%"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "What flowed before.",
    }
    OVERLOAD_AMBIENT = "overload ambient" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Temperature], &["degC"])),
        sense: Exact,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "At what air temperature.",
    }
    LIMITING_TEMPERATURE = "limiting temperature" {
        wordings: ["hottest-spot limit", "total temperature limit"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Temperature], &["degC"])),
        sense: Exact,
        basis: "IEC 62271-1, C37.010 (memory)",
        meaning: "Of the part that governs the temperature rise; absent: 105 degC.",
    }
    TEMPERATURE_RISE_TEST_CURRENT = "temperature-rise test current" {
        wordings: ["temperature-rise test at the highest ambient"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms).with(Tail::AtTemperature)),
        sense: AtLeast,
        basis: "IEC 62271-1 7.4 (memory)",
        meaning: "A proof asked for at an air temperature other than 40 degC.",
    }
    TEMPERATURE_RISE_TEST_FREQUENCY = "temperature-rise test frequency" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Frequency], &["Hz"])),
        sense: Exact,
        basis: "IEC 62271-1 7.4 (memory)",
        meaning: "Where a test at the other frequency is admitted.",
    }
    MAIN_CIRCUIT_RESISTANCE = "main circuit resistance" {
        wordings: ["contact resistance"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance], &["uohm"])),
        sense: AtMost,
        basis: "IEC 62271-1 (memory)",
        meaning: "Terminal to terminal.",
    }
    DISCONNECTOR_RATED_CURRENT = "disconnector rated current" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "practice",
        meaning: "What else carries the bay's current; compared along the bay.",
    }
    CURRENT_TRANSFORMER_RATED_CURRENT = "current transformer rated current" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "practice",
        meaning: "What else carries the bay's current; compared along the bay.",
    }
    BUSBAR_RATED_CURRENT = "busbar rated current" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "practice",
        meaning: "What else carries the bay's current; compared along the bay.",
    }
}
