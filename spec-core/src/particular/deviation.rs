//! Particulars of the sheet `deviation`. A finding that was accepted.

use crate::particular::{Kind, particulars};

particulars! { Deviation, "deviation";
    REASON = "reason" {
        kind: Kind::Text,
        sense: Exact,
        basis: "practice",
        meaning: "Why it is accepted.",
    }
    APPROVED = "approved" {
        wordings: ["approved by", "owner"],
        kind: Kind::Text,
        sense: Exact,
        basis: "practice",
        meaning: "Who accepted it.",
    }
    UNTIL = "until" {
        wordings: ["expires", "valid until"],
        kind: Kind::Date,
        sense: Exact,
        basis: "practice",
        meaning: "Last day on which it holds.",
    }
    MEASURE = "measure" {
        wordings: ["compensating measure", "condition"],
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "What is done instead.",
    }
}
