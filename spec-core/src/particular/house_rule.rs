//! Particulars of the sheet `house-rule`. A requirement of the buyer's own organisation.

use crate::particular::{Kind, particulars};

particulars! { HouseRule, "house-rule";
    APPLIES_WHEN = "applies when" {
        wordings: ["when", "if"],
        kind: Kind::Expression,
        sense: Exact,
        basis: "common practice, no source",
        meaning: "Where the rule holds; absent: everywhere.",
    }
    REQUIRES = "requires" {
        wordings: ["must hold"],
        kind: Kind::Expression,
        sense: Exact,
        basis: "common practice, no source",
        meaning: "What must be true.",
    }
    OTHERWISE = "otherwise" {
        wordings: ["finding"],
        kind: Kind::Outcome,
        sense: Exact,
        basis: "common practice, no source",
        meaning: "What is said when it is not.",
    }
    BASIS = "basis" {
        wordings: ["reason", "source"],
        kind: Kind::Text,
        sense: Exact,
        basis: "common practice, no source",
        meaning: "What the rule rests on.",
    }
}
