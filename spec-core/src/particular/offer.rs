//! Particulars of the sheet `offer`. What a bidder guarantees, beside the particulars of the breaker.

use crate::particular::{Kind, particulars};

particulars! { Offer, "offer";
    BIDDER = "bidder" {
        wordings: ["manufacturer's reference", "tenderer"],
        kind: Kind::Text,
        sense: Exact,
        basis: "practice",
        meaning: "Who offers.",
    }
    TYPE_DESIGNATION = "type designation" {
        wordings: ["breaker type offered"],
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "What is offered.",
    }
    DECLARED_DEVIATIONS = "declared deviations" {
        wordings: ["list of deviations", "exceptions"],
        kind: Kind::Labels,
        sense: Set,
        basis: "practice",
        meaning: "The particulars in which the bidder says that he departs.",
    }
    TYPE_TEST_REPORT = "type test report" {
        wordings: ["report number"],
        kind: Kind::Text,
        sense: Exact,
        basis: "practice",
        meaning: "The report on which the guarantees rest.",
    }
    TYPE_TEST_DATE = "type test date" {
        wordings: ["report date"],
        kind: Kind::Date,
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "Its date.",
    }
}
