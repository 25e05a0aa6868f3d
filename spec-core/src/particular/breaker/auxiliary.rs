//! Particulars of a breaker: auxiliary and control.

use crate::particular::{Extent, Kind, QuantityKind, Tail, particulars};
use crate::quantity::Dimension;

particulars! { Breaker, "auxiliary and control";
    RATED_SUPPLY_VOLTAGE = "rated supply voltage" {
        wordings: ["control voltage", "rated auxiliary voltage", "supply voltage"],
        symbols: ["Ua"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["V"]).with(Tail::Supply)),
        sense: Exact,
        basis: "IEC 62271-1 5.9 (memory)",
        meaning: "Of closing and opening devices and control circuits.",
    }
    SUPPLY_VOLTAGE_AT_THE_TERMINALS = "supply voltage at the terminals" {
        wordings: ["supply range", "battery range", "control voltage range", "supply voltage range"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["V"]).extending(Extent::Range)),
        sense: Range,
        basis: "IEC 62271-1 5.9 (memory)",
        meaning: "Least and greatest at the breaker's terminals.",
    }
    CLOSING_RANGE = "closing range" {
        wordings: ["closing voltage range", "closing device range"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share, Dimension::Voltage], &["%", "V"]).extending(Extent::Range)),
        sense: Contains,
        basis: "IEC 62271-1, IEEE C37.04 (memory)",
        meaning: "Where closing is sure.",
    }
    OPENING_RANGE = "opening range" {
        wordings: ["tripping range", "tripping voltage range", "opening device range"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share, Dimension::Voltage], &["%", "V"]).extending(Extent::Range)),
        sense: Contains,
        basis: "IEC 62271-1, IEEE C37.04 (memory)",
        meaning: "Where opening is sure.",
    }
    TRIP_COILS = "trip coils" {
        wordings: ["opening releases", "number of trip coils"],
        kind: Kind::Count,
        sense: AtLeast,
        basis: "practice",
        meaning: "Independent ones.",
    }
    COIL_POWER = "coil power" {
        wordings: ["trip coil power"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ActivePower], &["W"])),
        sense: AtMost,
        carried: true,
        basis: "practice",
        meaning: "Of one coil.",
    }
    COIL_PICK_UP_CURRENT = "coil pick-up current" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["mA"])),
        sense: AtLeast,
        basis: "practice",
        meaning: "Below it a coil does not move.",
    }
    TRIP_CIRCUIT_SUPERVISION_CURRENT = "trip-circuit supervision current" {
        wordings: ["supervision current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["mA"])),
        sense: AtMost,
        basis: "practice",
        meaning: "Flows through the coil at rest.",
    }
    MOTOR_SUPPLY_VOLTAGE = "motor supply voltage" {
        wordings: ["motor voltage", "charging motor voltage"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["V"]).with(Tail::Supply)),
        sense: Exact,
        basis: "practice",
        meaning: "Of the charging motor.",
    }
    MOTOR_SUPPLY_PHASES = "motor supply phases" {
        kind: Kind::Count,
        sense: Exact,
        basis: "practice",
        meaning: "Single-phase or three-phase motor.",
    }
    HEATER_SUPPLY_VOLTAGE = "heater supply voltage" {
        wordings: ["mechanism heater", "heater voltage"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["V"]).with(Tail::Supply)),
        sense: Exact,
        basis: "practice",
        meaning: "Of cabinet and mechanism heaters.",
    }
    AUXILIARY_CONTACTS_NO = "auxiliary contacts NO" {
        kind: Kind::Count,
        sense: AtLeast,
        basis: "practice",
        meaning: "Free for the buyer.",
    }
    AUXILIARY_CONTACTS_NC = "auxiliary contacts NC" {
        kind: Kind::Count,
        sense: AtLeast,
        basis: "practice",
        meaning: "Free for the buyer.",
    }
    AUXILIARY_CONTACTS_NEEDED_NO = "auxiliary contacts needed NO" {
        kind: Kind::Count,
        sense: Exact,
        basis: "practice",
        meaning: "What the control scheme uses.",
    }
    AUXILIARY_CONTACTS_NEEDED_NC = "auxiliary contacts needed NC" {
        kind: Kind::Count,
        sense: Exact,
        basis: "practice",
        meaning: "What the control scheme uses.",
    }
    DEGREE_OF_PROTECTION = "degree of protection" {
        wordings: ["enclosure protection", "IP code"],
        kind: Kind::Text,
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 60529 (memory)",
        meaning: "Of cubicle and drive.",
    }
    ANTI_PUMPING = "anti-pumping" {
        wordings: ["anti-pumping device"],
        kind: Kind::YesNo,
        sense: Set,
        carried: true,
        basis: "IEC 60050-441 (memory)",
        meaning: "Does not close again by itself.",
    }
}
