//! Particulars of a breaker: short circuit.

use crate::particular::{Kind, QuantityKind, Tail, particulars};
use crate::quantity::{Dimension, Qualifier};

particulars! { Breaker, "short circuit";
    RATED_SHORT_CIRCUIT_BREAKING_CURRENT = "rated short-circuit breaking current" {
        wordings: ["rated short-circuit current", "short-circuit breaking current", "rated interrupting current", "symmetrical interrupting capability"],
        symbols: ["Isc"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 5.101, IEEE C37.04 (memory)",
        meaning: "The AC component that it breaks.",
    }
    DC_TIME_CONSTANT = "DC time constant" {
        wordings: ["DC time constant of the rated short-circuit breaking current", "rated DC time constant"],
        symbols: ["tau"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 5.101 (memory)",
        meaning: "45 ms or a special one.",
    }
    DC_COMPONENT_AT_CONTACT_SEPARATION = "DC component at contact separation" {
        wordings: ["percentage DC component", "percent DC", "DC component"],
        symbols: ["%DC"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 5.101 (memory)",
        meaning: "Of the AC peak, at contact separation.",
    }
    DC_CURRENT_AT_CONTACT_SEPARATION = "DC current at contact separation" {
        wordings: ["DC component in kiloamperes"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"])),
        sense: AtLeast,
        basis: "IEC 62271-100 5.101 (memory)",
        meaning: "The same as a current; must equal sqrt2 * Isc * percentage.",
    }
    ASYMMETRICAL_BREAKING_CURRENT = "asymmetrical breaking current" {
        wordings: ["asymmetrical interrupting capability", "total breaking current"],
        symbols: ["Iasym"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        basis: "IEEE C37.04 (memory)",
        meaning: "Rms of AC and DC together.",
    }
    RATED_SHORT_CIRCUIT_MAKING_CURRENT = "rated short-circuit making current" {
        wordings: ["making current", "closing and latching current", "close-and-latch current", "peak making current"],
        symbols: ["Ima"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 5.103, IEEE C37.04 (memory)",
        meaning: "First peak when closing on a fault; a value in kA rms belongs to the older rating structure.",
    }
    RATED_SHORT_TIME_WITHSTAND_CURRENT = "rated short-time withstand current" {
        wordings: ["short-time current", "rated short-time current"],
        symbols: ["Ik"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms).with(Tail::ForTime)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 5.6 (memory)",
        meaning: "Carried closed for tk; 20 kA for 1 s states both.",
    }
    RATED_DURATION_OF_SHORT_CIRCUIT = "rated duration of short-circuit" {
        wordings: ["short-time duration", "duration of short-circuit"],
        symbols: ["tk"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["s"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 5.8 (memory)",
        meaning: "0.5, 1, 2 or 3 s.",
    }
    RATED_PEAK_WITHSTAND_CURRENT = "rated peak withstand current" {
        wordings: ["peak withstand current"],
        symbols: ["Ip"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 5.7 (memory)",
        meaning: "First peak carried closed.",
    }
    SHORT_CIRCUIT_CURRENT_THROUGH_THE_BREAKER = "short-circuit current through the breaker" {
        wordings: ["breaker's own share", "largest through-fault current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC 60909, C37.010 (memory)",
        meaning: "The documented share, where it is less than the bus current.",
    }
    NUMBER_OF_SHORT_CIRCUIT_INTERRUPTIONS = "number of short-circuit interruptions" {
        wordings: ["full short-circuit operations"],
        kind: Kind::Count,
        sense: AtLeast,
        basis: "IEC/TR 62271-310 (memory)",
        meaning: "Full short-circuits before maintenance.",
    }
    SUMMATED_BREAKING_CURRENT = "summated breaking current" {
        wordings: ["cumulative breaking current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        carried: true,
        basis: "IEC/TR 62271-310 (memory)",
        meaning: "Sum of broken currents before maintenance.",
    }
    INTERRUPTING_CLASS = "interrupting class" {
        wordings: ["nominal interrupting class", "MVA class"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ApparentPower], &["MVA"])),
        sense: Exact,
        basis: "IEEE C37.06-1987 (memory)",
        meaning: "Name of a class in older texts.",
    }
    K_FACTOR = "K factor" {
        wordings: ["rated voltage range factor"],
        symbols: ["K"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEEE C37.06-1987 (memory)",
        meaning: "Of older editions only.",
    }
    PERMISSIBLE_TRIPPING_DELAY = "permissible tripping delay" {
        symbols: ["Y"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["s"])),
        sense: AtLeast,
        basis: "IEEE C37.04 old (memory)",
        meaning: "The older word for the short-time duration.",
    }
    SYSTEM_SOURCE_BREAKING_CURRENT = "system-source breaking current" {
        wordings: ["system-source short-circuit breaking current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC/IEEE 62271-37-013 (memory)",
        meaning: "Of a generator breaker, fault fed from the system; the same as Isc.",
    }
    GENERATOR_SOURCE_BREAKING_CURRENT = "generator-source breaking current" {
        wordings: ["generator-source short-circuit breaking current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC/IEEE 62271-37-013 (memory)",
        meaning: "Of a generator breaker, fault fed by the generator.",
    }
    GENERATOR_SOURCE_DC_COMPONENT = "generator-source DC component" {
        wordings: ["generator-source asymmetry", "degree of asymmetry"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC/IEEE 62271-37-013 (memory)",
        meaning: "DC share of the current above; may exceed 100 %.",
    }
    DOUBLE_EARTH_FAULT_BREAKING_CURRENT = "double-earth-fault breaking current" {
        wordings: ["cross-country fault breaking current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Across sqrt3 times the phase voltage; 0.87 Isc.",
    }
}
