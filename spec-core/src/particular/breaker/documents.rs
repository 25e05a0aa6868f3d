//! Particulars of a breaker: documents.

use crate::particular::{Kind, QuantityKind, particulars};
use crate::quantity::Dimension;

particulars! { Breaker, "documents";
    DOCUMENTS_WITH_THE_OFFER = "documents with the offer" {
        kind: Kind::Texts,
        sense: Set,
        carried: true,
        basis: "practice",
        meaning: "What a bidder hands in.",
    }
    DOCUMENTS_AFTER_ORDER = "documents after order" {
        kind: Kind::Texts,
        sense: Set,
        carried: true,
        basis: "practice",
        meaning: "What the supplier hands in.",
    }
    SPARE_PARTS = "spare parts" {
        wordings: ["spares"],
        kind: Kind::Texts,
        sense: Set,
        carried: true,
        basis: "practice",
        meaning: "What is to be priced.",
    }
    SPARE_FOR = "spare for" {
        wordings: ["spare breaker for"],
        kind: Kind::Names,
        sense: Set,
        basis: "practice",
        meaning: "The breakers for which this one is the spare.",
    }
    WARRANTY = "warranty" {
        wordings: ["guarantee period"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["months", "years"])),
        sense: AtLeast,
        carried: true,
        basis: "practice",
        meaning: "How long.",
    }
}
