//! Particulars of the sheet `tender`. What holds for the whole tender.

use crate::particular::{Kind, QuantityKind, particulars, words};
use crate::quantity::Dimension;

particulars! { Tender, "tender";
    REFERENCE = "reference" {
        wordings: ["tender number", "document number", "enquiry number"],
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "The number under which the tender is filed.",
    }
    REVISION = "revision" {
        wordings: ["issue", "rev"],
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "The revision of this text.",
    }
    STATUS = "status" {
        wordings: ["document status"],
        kind: Kind::Words { list: &words::STATUS, alternatives: false },
        sense: Exact,
        basis: "practice",
        meaning: "Draft, for review or issued; an open point blocks only an issued text.",
    }
    ISSUE_DATE = "issue date" {
        wordings: ["date of issue"],
        kind: Kind::Date,
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "The day on which this revision is issued; the reference date of undated standards if no other is given.",
    }
    PURCHASER = "purchaser" {
        wordings: ["buyer", "owner", "customer", "employer"],
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "Who buys.",
    }
    PROJECT = "project" {
        wordings: ["substation project"],
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "What the purchase belongs to.",
    }
    STANDARDS = "standards" {
        wordings: ["applicable standards", "codes and standards"],
        kind: Kind::Standards,
        sense: Set,
        basis: "IEC 62271-1 (memory)",
        meaning: "The standards that hold, with their editions; also in a breaker, where it replaces the tender's list.",
    }
    REFERENCE_DATE_OF_STANDARDS = "reference date of standards" {
        wordings: ["edition date", "standards valid at"],
        kind: Kind::DateOrWords(&words::REFERENCE_DATE),
        sense: Exact,
        basis: "practice",
        meaning: "Which edition of an undated standard is meant.",
    }
    ORDER_OF_PRECEDENCE = "order of precedence" {
        wordings: ["precedence", "governing order"],
        kind: Kind::Texts,
        sense: Exact,
        basis: "practice",
        meaning: "Which document or which rating structure governs where two differ.",
    }
    GOVERNING_LANGUAGE = "governing language" {
        wordings: ["ruling language"],
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "The language whose text governs.",
    }
    JURISDICTION = "jurisdiction" {
        wordings: ["legal territory"],
        kind: Kind::WordsOrText(&words::JURISDICTION),
        sense: Exact,
        basis: "Reg. (EU) 2024/573; 17 CCR 95352 (memory)",
        meaning: "Whose law on gases holds; also in a site, where it replaces the tender's.",
    }
    COMMISSIONING = "commissioning" {
        wordings: ["put into operation", "putting into operation", "energisation", "in-service date"],
        kind: Kind::Date,
        sense: Exact,
        basis: "Reg. (EU) 2024/573 Art. 13(9) (memory)",
        meaning: "When the breaker is first put into operation; also in a site or a breaker, where it replaces the tender's.",
    }
    DATE_OF_ACQUISITION = "date of acquisition" {
        wordings: ["purchase date", "acquisition"],
        kind: Kind::Date,
        sense: Exact,
        basis: "17 CCR 95352 (memory)",
        meaning: "When the breaker becomes the buyer's, where the law counts from that day.",
    }
    GWP_BASIS = "GWP basis" {
        wordings: ["global warming potential basis"],
        kind: Kind::Words { list: &words::GWP_BASIS, alternatives: false },
        sense: Exact,
        basis: "IPCC reports (memory)",
        meaning: "The table of warming potentials to be used.",
    }
    TOTAL_QUANTITY = "total quantity" {
        wordings: ["quantity of breakers", "number of breakers in all"],
        kind: Kind::Count,
        sense: Exact,
        basis: "practice",
        meaning: "The number that the quantity table asks for, all breaker sheets together.",
    }
    SHORT_CIRCUIT_MARGIN = "short-circuit margin" {
        wordings: ["fault-level margin", "breaking-current margin"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: AtLeast,
        basis: "buyer's policy",
        meaning: "The reserve between duty and rated breaking current that the buyer's policy asks for.",
    }
    SERVICE_LIFE = "service life" {
        wordings: ["design life", "expected life"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["years"])),
        sense: AtLeast,
        basis: "practice",
        meaning: "The years over which operations are counted.",
    }
    AMENDMENTS = "amendments" {
        wordings: ["changes in this revision", "amendment list"],
        kind: Kind::Texts,
        sense: Set,
        basis: "practice",
        meaning: "The particulars that the revision says it changes.",
    }
    NOTES = "notes" {
        wordings: ["remarks", "general notes"],
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "common practice, no source",
        meaning: "Anything else; carried into the schedule and not checked.",
    }
}
