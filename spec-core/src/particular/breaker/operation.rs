//! Particulars of a breaker: operation and times.

use crate::particular::{Kind, QuantityKind, particulars, words};
use crate::quantity::Dimension;

particulars! { Breaker, "operation and times";
    RATED_OPERATING_SEQUENCE = "rated operating sequence" {
        wordings: ["operating sequence", "operating duty", "rated operating duty", "duty cycle"],
        kind: Kind::Sequence,
        sense: Covers,
        from_duty: true,
        basis: "IEC 62271-100 5.104 (memory)",
        meaning: "O - t - CO - t' - CO with times.",
    }
    CLASSES = "classes" {
        wordings: ["class", "performance classes"],
        kind: Kind::Classes,
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100, IEEE C37.04a (memory)",
        meaning: "Restrike, electrical and mechanical endurance, TRV system class.",
    }
    OPENING_TIME = "opening time" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms", "cycles"])),
        sense: Range,
        basis: "IEC 62271-100 (memory)",
        meaning: "Trip impulse to contact separation; the least counts for DC, the greatest for clearing.",
    }
    BREAK_TIME = "break time" {
        wordings: ["interrupting time", "total break time"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms", "cycles"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 60050-441 (memory)",
        meaning: "Trip impulse to end of arcing.",
    }
    ARCING_TIME = "arcing time" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: AtMost,
        carried: true,
        basis: "IEC 60050-441 (memory)",
        meaning: "Separation to extinction.",
    }
    CLOSING_TIME = "closing time" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms", "cycles"])),
        sense: AtMost,
        basis: "IEC 60050-441 (memory)",
        meaning: "Close impulse to contact touch.",
    }
    MAKE_TIME = "make time" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: AtMost,
        carried: true,
        basis: "IEC 60050-441 (memory)",
        meaning: "Close impulse to first current.",
    }
    OPEN_CLOSE_TIME = "open-close time" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: AtMost,
        basis: "IEC 60050-441 (memory)",
        meaning: "Contact separation to touch in reclosing.",
    }
    CLOSE_OPEN_TIME = "close-open time" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: Range,
        basis: "IEC 60050-441 (memory)",
        meaning: "Touch to separation in a CO.",
    }
    TRIP_TO_REMAKE_TIME = "trip-to-remake time" {
        wordings: ["reclosing time"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["cycles", "ms"])),
        sense: Range,
        basis: "IEEE C37.04 (memory)",
        meaning: "Trip energised to contacts closed again; not the dead time.",
    }
    POLE_SIMULTANEITY_ON_OPENING = "pole simultaneity on opening" {
        wordings: ["opening simultaneity", "simultaneity on opening"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Spread between poles; one sixth of a cycle at most.",
    }
    POLE_SIMULTANEITY_ON_CLOSING = "pole simultaneity on closing" {
        wordings: ["closing simultaneity", "simultaneity on closing"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Spread between poles; a quarter of a cycle at most.",
    }
    POLE_DISCREPANCY_PROTECTION = "pole discrepancy protection" {
        wordings: ["pole discordance protection"],
        kind: Kind::YesNo,
        sense: Set,
        basis: "practice",
        meaning: "Trips all poles when one is left behind.",
    }
    DRIVE = "drive" {
        wordings: ["operating mechanism", "mechanism"],
        kind: Kind::Words { list: &words::DRIVE, alternatives: false },
        sense: Set,
        basis: "IEC 62271-100 (memory)",
        meaning: "What moves the contacts.",
    }
    SPRING_CHARGING_TIME = "spring charging time" {
        wordings: ["recharge time", "stored-energy charging time", "pump time"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["s"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-100 5.104 (memory)",
        meaning: "Time to restore the energy.",
    }
    STORED_SEQUENCE = "stored sequence" {
        wordings: ["stored-energy capacity"],
        kind: Kind::Sequence,
        sense: Covers,
        carried: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "What it does without supply.",
    }
    CONTROLLED_SWITCHING = "controlled switching" {
        wordings: ["point-on-wave switching", "synchronised switching", "POW"],
        kind: Kind::Words { list: &words::CONTROLLED_SWITCHING, alternatives: false },
        sense: Set,
        basis: "IEC/TR 62271-302 (memory)",
        meaning: "Operations at a chosen instant.",
    }
    CLOSING_TIME_SCATTER = "closing time scatter" {
        wordings: ["scatter", "operating time scatter"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: AtMost,
        basis: "IEC/TR 62271-302 (memory)",
        meaning: "Spread of one pole's closing time (3 sigma).",
    }
    CLOSING_RESISTOR = "closing resistor" {
        wordings: ["pre-insertion resistor", "PIR"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance], &["ohm"]).or_none()),
        sense: Exact,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "Resistor put in before the main contact, a pole.",
    }
    CLOSING_RESISTOR_INSERTION_TIME = "closing resistor insertion time" {
        wordings: ["insertion time"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: Range,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "How long it is in.",
    }
    CLOSING_RESISTOR_DUTY = "closing resistor duty" {
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "Closings in a row that it must bear.",
    }
}
