//! Particulars of a breaker: capacitive and inductive.

use crate::particular::{Kind, QuantityKind, particulars, words};
use crate::quantity::{Dimension, Qualifier};

particulars! { Breaker, "capacitive and inductive";
    RATED_LINE_CHARGING_BREAKING_CURRENT = "rated line-charging breaking current" {
        wordings: ["line-charging breaking current", "line-charging switching current", "overhead-line switching current"],
        symbols: ["Il"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Unloaded overhead line.",
    }
    RATED_CABLE_CHARGING_BREAKING_CURRENT = "rated cable-charging breaking current" {
        wordings: ["cable-charging breaking current", "cable-charging switching current"],
        refused: ["Ic"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Unloaded cable.",
    }
    RATED_CAPACITOR_BANK_BREAKING_CURRENT = "rated capacitor bank breaking current" {
        wordings: ["rated single capacitor bank breaking current", "isolated bank switching current"],
        symbols: ["Isb"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "One bank alone.",
    }
    RATED_BACK_TO_BACK_CAPACITOR_BANK_BREAKING_CURRENT = "rated back-to-back capacitor bank breaking current" {
        wordings: ["back-to-back bank switching current"],
        symbols: ["Ibb"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "One bank while another is on.",
    }
    RATED_CAPACITOR_BANK_INRUSH_MAKING_CURRENT = "rated capacitor bank inrush making current" {
        wordings: ["rated inrush making current", "inrush current"],
        symbols: ["Ibi"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Peak on closing a bank.",
    }
    RATED_INRUSH_FREQUENCY = "rated inrush frequency" {
        wordings: ["frequency of the inrush current", "inrush frequency"],
        symbols: ["fbi"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Frequency], &["kHz", "Hz"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Of the current above.",
    }
    CAPACITIVE_VOLTAGE_FACTOR = "capacitive voltage factor" {
        symbols: ["kc"],
        kind: Kind::Ratio,
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "1.0, 1.2, 1.4 or 1.7.",
    }
    SHUNT_REACTOR_BREAKING_CURRENT = "shunt reactor breaking current" {
        wordings: ["shunt reactor switching current", "inductive load breaking current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-110, IEEE C37.015 (memory)",
        meaning: "Reactor current that it breaks.",
    }
    CHOPPING_NUMBER = "chopping number" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ChoppingNumber], &["A/F^0.5"])),
        sense: AtMost,
        basis: "IEC 62271-110 (memory)",
        meaning: "Size of current chopping.",
    }
    MOTOR_BREAKING_CURRENT = "motor breaking current" {
        wordings: ["high-voltage motor switching current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        basis: "IEC 62271-110 (memory)",
        meaning: "Starting or stalled motor.",
    }
    OVERVOLTAGE_MITIGATION = "overvoltage mitigation" {
        wordings: ["switching overvoltage mitigation"],
        kind: Kind::WordSet(&words::MITIGATION),
        sense: Set,
        basis: "IEC 62271-110 (memory)",
        meaning: "What limits switching overvoltages and inrush.",
    }
}
