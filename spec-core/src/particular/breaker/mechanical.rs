//! Particulars of a breaker: construction and mechanical.

use crate::particular::{Kind, QuantityKind, particulars, words};
use crate::quantity::{Dimension, Qualifier};

particulars! { Breaker, "construction and mechanical";
    SEISMIC_QUALIFICATION = "seismic qualification" {
        wordings: ["seismic level"],
        kind: Kind::WordsOrQuantity(&words::SEISMIC_LEVEL, QuantityKind::of(&[Dimension::Acceleration], &["g"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEEE 693, IEC 62271-300/-207 (memory)",
        meaning: "Level to which it is qualified.",
    }
    STATIC_TERMINAL_LOAD_LONGITUDINAL = "static terminal load longitudinal" {
        symbols: ["Fth"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Force], &["N", "kN", "lbf"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Pull on the terminals.",
    }
    STATIC_TERMINAL_LOAD_TRANSVERSE = "static terminal load transverse" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Force], &["N", "kN", "lbf"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Pull on the terminals.",
    }
    STATIC_TERMINAL_LOAD_VERTICAL = "static terminal load vertical" {
        symbols: ["Ftv"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Force], &["N", "kN", "lbf"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Pull on the terminals.",
    }
    LIVE_PART_HEIGHT_OF_THE_BREAKER = "live-part height of the breaker" {
        wordings: ["height of live parts of the breaker"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["m"])),
        sense: AtLeast,
        basis: "IEC 61936-1 (memory)",
        meaning: "Of its lowest live part on the structure asked for.",
    }
    BUSHING_CURRENT_TRANSFORMERS = "bushing current transformers" {
        wordings: ["number of bushing current transformers", "BCT"],
        kind: Kind::Count,
        sense: AtLeast,
        basis: "IEC 61869-2, IEEE C57.13 (memory)",
        meaning: "Ring cores on the bushings.",
    }
    BUSHING_CURRENT_TRANSFORMER_DATA = "bushing current transformer data" {
        kind: Kind::Text,
        sense: Exact,
        basis: "IEC 61869-2, IEEE C57.13 (memory)",
        meaning: "Ratio, class, burden.",
    }
    INTERNAL_ARC_CLASSIFICATION = "internal arc classification" {
        wordings: ["internal arc", "IAC"],
        kind: Kind::Text,
        sense: Covers,
        basis: "IEC 62271-200, -203 (memory)",
        meaning: "Sides that are safe.",
    }
    INTERNAL_ARC_CURRENT = "internal arc current" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms).or_none()),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-200 (memory)",
        meaning: "With the class above.",
    }
    INTERNAL_ARC_DURATION = "internal arc duration" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["s"])),
        sense: AtLeast,
        basis: "IEC 62271-200 (memory)",
        meaning: "With the class above.",
    }
    ZINC_COATING = "zinc coating" {
        wordings: ["galvanising", "galvanizing"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["um"])),
        sense: AtLeast,
        basis: "ISO 1461 (memory)",
        meaning: "Thickness on steel.",
    }
}
