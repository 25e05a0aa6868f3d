//! Particulars of the sheet `infeed`. One source of short-circuit current.

use crate::particular::{Kind, QuantityKind, Tail, particulars, words};
use crate::quantity::{Dimension, Qualifier};

particulars! { Infeed, "infeed";
    KIND = "kind" {
        wordings: ["kind of infeed", "source kind"],
        kind: Kind::Words { list: &words::INFEED_KIND, alternatives: false },
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "What feeds.",
    }
    SHORT_CIRCUIT_CURRENT = "short-circuit current" {
        wordings: ["initial symmetrical short-circuit current", "three-phase short-circuit current"],
        symbols: ["Ik3", "Ik\""],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a network infeed, at its own voltage; of a converter plant, its largest contribution.",
    }
    FAULT_LEVEL = "fault level" {
        wordings: ["short-circuit power"],
        symbols: ["Sk\""],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ApparentPower], &["MVA", "GVA"]).with(Tail::AtVoltage)),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a network infeed, instead of the current.",
    }
    SINGLE_PHASE_SHORT_CIRCUIT_CURRENT = "single-phase short-circuit current" {
        symbols: ["Ik1"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a network infeed, where known.",
    }
    X_OVER_R = "X/R" {
        wordings: ["X/R ratio"],
        symbols: ["X/R"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of this infeed alone.",
    }
    R_OVER_X = "R/X" {
        wordings: ["R/X ratio"],
        symbols: ["R/X"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The reciprocal.",
    }
    X0_OVER_X1 = "X0/X1" {
        symbols: ["X0/X1"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of this infeed alone.",
    }
    R0_OVER_X0 = "R0/X0" {
        symbols: ["R0/X0"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of this infeed's zero-sequence impedance.",
    }
    NOMINAL_VOLTAGE = "nominal voltage" {
        symbols: ["Un"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The nominal voltage at which a network infeed's values hold.",
    }
    RATED_VOLTAGE = "rated voltage" {
        wordings: ["machine voltage"],
        symbols: ["Ur", "UrG", "UrM"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a generator or a motor.",
    }
    HIGH_VOLTAGE_SIDE = "high-voltage side" {
        wordings: ["rated high voltage", "primary voltage"],
        symbols: ["UrHV"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a transformer.",
    }
    LOW_VOLTAGE_SIDE = "low-voltage side" {
        wordings: ["rated low voltage", "secondary voltage"],
        symbols: ["UrLV"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a transformer.",
    }
    RATED_POWER = "rated power" {
        wordings: ["rating", "rated apparent power"],
        symbols: ["Sr"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ApparentPower, Dimension::ActivePower], &["MVA", "MW"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a transformer, generator, motor group or converter plant.",
    }
    IMPEDANCE_VOLTAGE = "impedance voltage" {
        wordings: ["short-circuit voltage", "short-circuit impedance", "percent impedance"],
        symbols: ["uk", "xk"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "IEC 60076 (memory)",
        meaning: "Of a transformer.",
    }
    LOAD_LOSSES = "load losses" {
        wordings: ["copper losses"],
        symbols: ["PkrT"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ActivePower], &["kW"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a transformer; gives its resistance.",
    }
    ZERO_SEQUENCE_IMPEDANCE_VOLTAGE = "zero-sequence impedance voltage" {
        symbols: ["uk0"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        carried: true,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a transformer, where it differs.",
    }
    WINDING_CONNECTION = "winding connection" {
        wordings: ["vector group"],
        kind: Kind::Text,
        sense: Exact,
        carried: true,
        basis: "IEC 60076 (memory)",
        meaning: "Decides whether zero-sequence current passes.",
    }
    NEUTRAL = "neutral" {
        wordings: ["neutral of the infeed"],
        kind: Kind::Words { list: &words::NEUTRAL, alternatives: false },
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a transformer or machine on the breaker's side.",
    }
    NEUTRAL_IMPEDANCE = "neutral impedance" {
        wordings: ["neutral resistor", "neutral reactor"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance], &["ohm"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Counts three times in the zero sequence.",
    }
    ON_LOAD_TAP_RANGE = "on-load tap range" {
        wordings: ["tap range"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        carried: true,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a unit transformer, one side of the middle.",
    }
    VOLTAGE_FACTOR = "voltage factor" {
        wordings: ["c factor"],
        symbols: ["c"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Other than the standard's c.",
    }
    NUMBER_IN_PARALLEL = "number in parallel" {
        wordings: ["quantity"],
        kind: Kind::Count,
        sense: Exact,
        basis: "practice",
        meaning: "Equal infeeds side by side; absent: one.",
    }
    LENGTH = "length" {
        wordings: ["route length"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["km"])),
        sense: Exact,
        basis: "practice",
        meaning: "Of a line or a cable.",
    }
    RESISTANCE_PER_LENGTH = "resistance per length" {
        symbols: ["R'"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ImpedancePerLength], &["ohm/km"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Positive sequence, at 20 degC.",
    }
    REACTANCE_PER_LENGTH = "reactance per length" {
        symbols: ["X'"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ImpedancePerLength], &["ohm/km"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Positive sequence.",
    }
    ZERO_SEQUENCE_RESISTANCE_PER_LENGTH = "zero-sequence resistance per length" {
        symbols: ["R0'"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ImpedancePerLength], &["ohm/km"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Zero sequence.",
    }
    ZERO_SEQUENCE_REACTANCE_PER_LENGTH = "zero-sequence reactance per length" {
        symbols: ["X0'"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ImpedancePerLength], &["ohm/km"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Zero sequence.",
    }
    CAPACITANCE_PER_LENGTH = "capacitance per length" {
        symbols: ["C'"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::CapacitancePerLength], &["nF/km", "uF/km"])),
        sense: Exact,
        basis: "practice",
        meaning: "Positive sequence, of a line or a cable.",
    }
    SURGE_IMPEDANCE = "surge impedance" {
        wordings: ["wave impedance"],
        symbols: ["Z1"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance], &["ohm"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "Of one line or cable, positive sequence; for the network TRV.",
    }
    ZERO_SEQUENCE_SURGE_IMPEDANCE = "zero-sequence surge impedance" {
        symbols: ["Z0"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance], &["ohm"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "The same, zero sequence.",
    }
    SUBTRANSIENT_REACTANCE = "subtransient reactance" {
        wordings: ["x\"d"],
        symbols: ["xd\""],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a synchronous machine, saturated.",
    }
    ARMATURE_RESISTANCE = "armature resistance" {
        wordings: ["stator resistance"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance, Dimension::Share], &["ohm", "%"])),
        sense: Exact,
        carried: true,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a synchronous machine.",
    }
    POWER_FACTOR = "power factor" {
        wordings: ["cos phi"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Rated, of a machine.",
    }
    STARTING_CURRENT_RATIO = "starting current ratio" {
        wordings: ["locked-rotor current ratio"],
        symbols: ["ILR/IrM"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of asynchronous motors.",
    }
    EFFICIENCY = "efficiency" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        carried: true,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of asynchronous motors.",
    }
    POLE_PAIRS = "pole pairs" {
        kind: Kind::Count,
        sense: Exact,
        carried: true,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of asynchronous motors; decides the decay.",
    }
    NATURAL_FREQUENCY = "natural frequency" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Frequency], &["kHz"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "Of a transformer as seen from the breaker's side.",
    }
    CAPACITANCE_TO_EARTH = "capacitance to earth" {
        wordings: ["capacitance to ground"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Capacitance], &["nF"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "Of the apparatus and its connection.",
    }
    RESISTANCE = "resistance" {
        wordings: ["positive-sequence resistance"],
        symbols: ["R1"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance], &["ohm"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of an infeed given by its impedance at the system's voltage.",
    }
    REACTANCE = "reactance" {
        wordings: ["positive-sequence reactance"],
        symbols: ["X1"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance], &["ohm"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The same.",
    }
    ZERO_SEQUENCE_RESISTANCE = "zero-sequence resistance" {
        symbols: ["R0"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance], &["ohm"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The same, zero sequence.",
    }
    ZERO_SEQUENCE_REACTANCE = "zero-sequence reactance" {
        symbols: ["X0"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance], &["ohm"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The same, zero sequence.",
    }
}
