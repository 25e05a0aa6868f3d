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
    MIDDLE_VOLTAGE_SIDE = "middle-voltage side" {
        wordings: ["rated middle voltage", "tertiary voltage"],
        symbols: ["UrMV"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a transformer with three windings, the one between high and low.",
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
        meaning: "Of a transformer, a generator, one motor or a converter plant; of a power station unit, of generator and transformer alike.",
    }
    UNIT_TRANSFORMER_POWER = "unit transformer power" {
        wordings: ["rated power of the unit transformer"],
        symbols: ["SrT"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ApparentPower], &["MVA"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of the transformer of a power station unit, where it is not that of the generator.",
    }
    RATED_CURRENT = "rated current" {
        symbols: ["Ir"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a series reactor that is given by its impedance voltage.",
    }
    IMPEDANCE_VOLTAGE = "impedance voltage" {
        wordings: ["short-circuit voltage", "short-circuit impedance", "percent impedance"],
        symbols: ["uk", "xk"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "IEC 60076 (memory)",
        meaning: "Of a transformer; with three windings, between high and middle, at rated power.",
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
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a transformer, where it differs.",
    }
    IMPEDANCE_VOLTAGE_HIGH_TO_LOW = "impedance voltage high to low" {
        wordings: ["high-low impedance voltage"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a transformer with three windings, between high and low.",
    }
    LOAD_LOSSES_HIGH_TO_LOW = "load losses high to low" {
        wordings: ["high-low load losses"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ActivePower], &["kW"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The losses that belong to it.",
    }
    RATED_POWER_HIGH_TO_LOW = "rated power high to low" {
        wordings: ["high-low rated power"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ApparentPower], &["MVA"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The power that both are for; absent: the rated power.",
    }
    ZERO_SEQUENCE_IMPEDANCE_VOLTAGE_HIGH_TO_LOW = "zero-sequence impedance voltage high to low" {
        wordings: ["high-low zero-sequence impedance voltage"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The same in the zero sequence, where the three pairs differ.",
    }
    IMPEDANCE_VOLTAGE_MIDDLE_TO_LOW = "impedance voltage middle to low" {
        wordings: ["middle-low impedance voltage"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a transformer with three windings, between middle and low.",
    }
    LOAD_LOSSES_MIDDLE_TO_LOW = "load losses middle to low" {
        wordings: ["middle-low load losses"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ActivePower], &["kW"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The losses that belong to it.",
    }
    RATED_POWER_MIDDLE_TO_LOW = "rated power middle to low" {
        wordings: ["middle-low rated power"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ApparentPower], &["MVA"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The power that both are for; absent: the rated power.",
    }
    ZERO_SEQUENCE_IMPEDANCE_VOLTAGE_MIDDLE_TO_LOW = "zero-sequence impedance voltage middle to low" {
        wordings: ["middle-low zero-sequence impedance voltage"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The same in the zero sequence, where the three pairs differ.",
    }
    WINDING_CONNECTION = "winding connection" {
        wordings: ["vector group"],
        kind: Kind::Text,
        sense: Exact,
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
    FAR_SIDE_NEUTRAL = "neutral of the far side" {
        wordings: ["far-side neutral", "neutral of the other side"],
        kind: Kind::Words { list: &words::NEUTRAL, alternatives: false },
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a star winding of a transformer on the other side than the breaker's.",
    }
    ON_LOAD_TAP_RANGE = "on-load tap range" {
        wordings: ["tap range"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"]).or_none()),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a unit transformer, one side of the middle; none where it has no on-load tap changer.",
    }
    OFF_LOAD_TAP = "off-load tap" {
        symbols: ["pT"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a unit transformer without on-load tap changer, the tap in permanent use towards less impedance; absent: none.",
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
        basis: "IEC 60909-0 (memory)",
        meaning: "Of a synchronous machine; absent: the fictitious one of the peak current.",
    }
    VOLTAGE_RANGE = "voltage range" {
        wordings: ["generator voltage range"],
        symbols: ["pG"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "How far the voltage of a generator lies above its rated one for long; absent: not at all.",
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
        basis: "IEC 60909-0 (memory)",
        meaning: "Of asynchronous motors.",
    }
    POLE_PAIRS = "pole pairs" {
        kind: Kind::Count,
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Of asynchronous motors; decides the decay, and without it none is counted.",
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
