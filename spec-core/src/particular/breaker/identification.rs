//! Particulars of a breaker: identification.

use crate::particular::{Kind, particulars, words};

particulars! { Breaker, "identification";
    QUANTITY = "quantity" {
        wordings: ["number"],
        kind: Kind::Count,
        sense: Exact,
        basis: "practice",
        meaning: "How many of this breaker.",
    }
    BAYS = "bays" {
        wordings: ["bay list", "positions"],
        kind: Kind::Names,
        sense: Set,
        basis: "practice",
        meaning: "The bays that get it; their number must equal the quantity.",
    }
    ITEM = "item" {
        wordings: ["item number", "schedule item"],
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "Line of the price schedule.",
    }
    DRAWING = "drawing" {
        wordings: ["drawing number"],
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "Drawing that shows it.",
    }
    CONSTRUCTION = "construction" {
        wordings: ["type", "breaker type", "design"],
        kind: Kind::Words { list: &words::CONSTRUCTION, alternatives: true },
        sense: Set,
        basis: "IEC 62271-100, -108, -200, -203 (memory)",
        meaning: "The construction that is wanted.",
    }
    INTERRUPTER = "interrupter" {
        wordings: ["interrupting medium", "interrupting principle"],
        kind: Kind::Words { list: &words::INTERRUPTER, alternatives: true },
        sense: Set,
        basis: "IEC 60050-441 (memory)",
        meaning: "What interrupts.",
    }
    POLE_OPERATION = "pole operation" {
        wordings: ["operation of the poles", "poles per drive"],
        kind: Kind::Words { list: &words::POLE_OPERATION, alternatives: false },
        sense: Exact,
        from_duty: true,
        basis: "practice",
        meaning: "One drive a pole, or one for all three.",
    }
    NUMBER_OF_POLES = "number of poles" {
        wordings: ["poles"],
        kind: Kind::Count,
        sense: Exact,
        carried: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Absent: three.",
    }
    STANDARDS = "standards" {
        wordings: ["applicable standards", "codes and standards"],
        kind: Kind::Standards,
        sense: Set,
        basis: "IEC 62271-1 (memory)",
        meaning: "The standards that hold, with their editions; also in a breaker, where it replaces the tender's list.",
    }
    COMMISSIONING = "commissioning" {
        wordings: ["put into operation", "putting into operation", "energisation", "in-service date"],
        kind: Kind::Date,
        sense: Exact,
        basis: "Reg. (EU) 2024/573 Art. 13(9) (memory)",
        meaning: "When the breaker is first put into operation; also in a site or a breaker, where it replaces the tender's.",
    }
}
