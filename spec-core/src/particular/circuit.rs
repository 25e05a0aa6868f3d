//! Particulars of the sheet `circuit`. One thing that a breaker switches.

use crate::particular::{Kind, QuantityKind, particulars, words};
use crate::quantity::{Dimension, Qualifier};

particulars! { Circuit, "circuit";
    KIND = "kind" {
        wordings: ["kind of circuit", "connection", "switched object"],
        kind: Kind::Words { list: &words::CIRCUIT_KIND, alternatives: false },
        sense: Exact,
        basis: "IEC 62271-100, -110 (memory)",
        meaning: "What it switches.",
    }
    LOAD_CURRENT = "load current" {
        wordings: ["load", "normal load"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "practice",
        meaning: "The largest steady current.",
    }
    EMERGENCY_LOAD_CURRENT = "emergency load current" {
        wordings: ["emergency load", "transfer load"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "practice",
        meaning: "With a parallel circuit or a busbar out; governs if the larger.",
    }
    LENGTH = "length" {
        wordings: ["line length", "cable length", "route length"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["km", "mi"])),
        sense: Exact,
        basis: "practice",
        meaning: "Of a line or a cable.",
    }
    CAPACITANCE_PER_LENGTH = "capacitance per length" {
        wordings: ["line capacitance", "cable capacitance"],
        symbols: ["C'"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::CapacitancePerLength], &["nF/km", "uF/km"])),
        sense: Exact,
        basis: "practice",
        meaning: "Positive sequence.",
    }
    CHARGING_CURRENT = "charging current" {
        wordings: ["line-charging current", "cable-charging current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "practice",
        meaning: "Known instead of length and capacitance; in a mixed circuit that of the overhead part.",
    }
    CABLE_SECTION_CHARGING_CURRENT = "cable section charging current" {
        wordings: ["cable part charging current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "practice",
        meaning: "Of the cable in a mixed circuit.",
    }
    CABLE_CONSTRUCTION = "cable construction" {
        kind: Kind::Words { list: &words::CABLE_CONSTRUCTION, alternatives: false },
        sense: Exact,
        basis: "IEC 62271-100 (memory)",
        meaning: "Decides kc.",
    }
    PARALLEL_CIRCUITS = "parallel circuits" {
        wordings: ["parallel feeders", "parallel cable feeders"],
        kind: Kind::Count,
        sense: Exact,
        basis: "practice",
        meaning: "Equal circuits on the same busbar, this one counted.",
    }
    SOURCE_AT_FAR_END = "source at far end" {
        wordings: ["second source at far end", "source at the remote end"],
        kind: Kind::YesNo,
        sense: Exact,
        basis: "IEC 62271-100 5.105 (memory)",
        meaning: "Whether the far end is live by itself, so that out of phase can happen.",
    }
    SYNCHRONISING = "synchronising" {
        wordings: ["synchronising duty", "synchronizing"],
        kind: Kind::YesNo,
        sense: Exact,
        basis: "IEC 62271-100 5.105 (memory)",
        meaning: "Whether the breaker joins two running systems.",
    }
    NEUTRAL_BEYOND_THE_BREAKER = "neutral beyond the breaker" {
        wordings: ["neutral of the circuit after opening"],
        kind: Kind::Words { list: &words::NEUTRAL, alternatives: false },
        sense: Exact,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "Earthing of the part that stays on the far side; decides kpp where it differs.",
    }
    AUTO_RECLOSING = "auto-reclosing" {
        wordings: ["auto-reclose", "reclosing scheme"],
        kind: Kind::Words { list: &words::AUTO_RECLOSING, alternatives: false },
        sense: Exact,
        basis: "IEC 62271-100 5.104 (memory)",
        meaning: "What the scheme does.",
    }
    AUTO_RECLOSING_DEAD_TIME = "auto-reclosing dead time" {
        wordings: ["dead time", "three-phase dead time"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["s", "cycles"])),
        sense: Exact,
        basis: "practice",
        meaning: "Current-free pause of the (three-phase) shot.",
    }
    SINGLE_PHASE_DEAD_TIME = "single-phase dead time" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["s", "cycles"])),
        sense: Exact,
        basis: "practice",
        meaning: "Of the single-phase shot, where both are used.",
    }
    SECOND_RECLOSING_AFTER = "second reclosing after" {
        wordings: ["second shot after"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["s"])),
        sense: Exact,
        basis: "practice",
        meaning: "Pause before the second shot.",
    }
    OPERATIONS_PER_DAY = "operations per day" {
        wordings: ["switching operations per day", "switchings per day"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::CountPerDay], &["per day"])),
        sense: Exact,
        basis: "practice",
        meaning: "How often it is switched.",
    }
    PROTECTION_SYSTEMS = "protection systems" {
        wordings: ["main protections"],
        kind: Kind::Count,
        sense: Exact,
        basis: "practice",
        meaning: "Independent ones that trip it; each wants its coil.",
    }
    SERIES_REACTOR = "series reactor" {
        wordings: ["series reactor reactance", "current-limiting reactor"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance], &["ohm"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "Reactance a phase in the circuit.",
    }
    SERIES_REACTOR_SIDE = "series reactor side" {
        kind: Kind::Words { list: &words::SERIES_REACTOR_SIDE, alternatives: false },
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "Seen from the breaker.",
    }
    SERIES_REACTOR_CAPACITANCE = "series reactor capacitance" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Capacitance], &["nF", "pF"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "Across or to earth, mitigation counted.",
    }
    SERIES_COMPENSATION = "series compensation" {
        wordings: ["series capacitor"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"]).or_none()),
        sense: Exact,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "Share of the line's reactance.",
    }
    SHUNT_COMPENSATION = "shunt compensation" {
        wordings: ["shunt reactors on the circuit"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ReactivePower], &["Mvar"])),
        sense: Exact,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "Reactors on the line or cable, all together.",
    }
    COMPENSATION_SWITCHED_WITH_THE_CIRCUIT = "compensation switched with the circuit" {
        wordings: ["reactors energised with the circuit"],
        kind: Kind::YesNo,
        sense: Exact,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "Whether they are closed in together with it.",
    }
    BANK_POWER = "bank power" {
        wordings: ["reactive power"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ReactivePower], &["Mvar", "kvar"])),
        sense: Exact,
        basis: "IEC 60871-1 (memory)",
        meaning: "Of the capacitor bank, filter or reactor, at the voltage below.",
    }
    BANK_VOLTAGE = "bank voltage" {
        wordings: ["voltage of the bank", "reactor voltage"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"])),
        sense: Exact,
        basis: "IEC 60871-1 (memory)",
        meaning: "Absent: the nominal voltage.",
    }
    PARALLEL_BANK_POWER = "parallel bank power" {
        wordings: ["parallel bank"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ReactivePower], &["Mvar", "kvar"])),
        sense: Exact,
        basis: "IEEE C37.012 (memory)",
        meaning: "Banks already on when this one is closed; present means back to back.",
    }
    INDUCTANCE_BETWEEN_BANKS = "inductance between banks" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Inductance], &["uH", "mH"])),
        sense: Exact,
        basis: "IEEE C37.012 (memory)",
        meaning: "Whole loop, reactors counted.",
    }
    BANK_NEUTRAL = "bank neutral" {
        wordings: ["neutral of the bank", "reactor neutral"],
        kind: Kind::Words { list: &words::BANK_NEUTRAL, alternatives: false },
        sense: Exact,
        basis: "IEC 62271-100 (memory)",
        meaning: "Of the bank or the reactor itself.",
    }
    TUNING_FREQUENCY = "tuning frequency" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Frequency], &["Hz"])),
        sense: Exact,
        basis: "IEC/TR 62271-306 (memory)",
        meaning: "Of a filter bank.",
    }
    CURRENT_LIMITING_INDUCTANCE = "current limiting inductance" {
        wordings: ["damping reactor"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Inductance], &["uH", "mH"])),
        sense: Exact,
        basis: "IEEE C37.012 (memory)",
        meaning: "In series with this bank alone.",
    }
    RATED_POWER = "rated power" {
        wordings: ["transformer power", "generator power", "motor power"],
        symbols: ["Sr"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ApparentPower, Dimension::ActivePower], &["MVA", "MW", "kW"])),
        sense: Exact,
        basis: "IEC 60076, 60034 (memory)",
        meaning: "Of the transformer or machine.",
    }
    HIGH_VOLTAGE_SIDE = "high-voltage side" {
        wordings: ["primary voltage"],
        symbols: ["UrHV"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"])),
        sense: Exact,
        basis: "IEC 60076 (memory)",
        meaning: "Of the transformer.",
    }
    LOW_VOLTAGE_SIDE = "low-voltage side" {
        wordings: ["secondary voltage"],
        symbols: ["UrLV"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"])),
        sense: Exact,
        basis: "IEC 60076 (memory)",
        meaning: "Of the transformer.",
    }
    IMPEDANCE_VOLTAGE = "impedance voltage" {
        wordings: ["short-circuit impedance", "short-circuit voltage", "percent impedance"],
        symbols: ["uk", "xk"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "IEC 60076 (memory)",
        meaning: "Of the transformer; gives the limited fault current.",
    }
    CONNECTION_LENGTH = "connection length" {
        wordings: ["length of the connection"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["m"])),
        sense: AtMost,
        basis: "IEEE C37.011 (memory)",
        meaning: "Bars or cable between breaker and transformer.",
    }
    CONNECTION_BY = "connection by" {
        kind: Kind::Words { list: &words::CONNECTION_BY, alternatives: false },
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "What joins breaker and transformer.",
    }
    NATURAL_FREQUENCY = "natural frequency" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Frequency], &["kHz"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "Of the transformer or reactor seen from the breaker.",
    }
    CAPACITANCE_TO_EARTH = "capacitance to earth" {
        wordings: ["capacitance to ground"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Capacitance], &["nF"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "Of the transformer or reactor with its connection.",
    }
    RESIDUAL_FLUX_CONTROL = "residual flux control" {
        kind: Kind::YesNo,
        sense: Exact,
        basis: "IEC/TR 62271-302 (memory)",
        meaning: "Whether energising takes account of it.",
    }
    GENERATOR_SOURCE_SHORT_CIRCUIT_CURRENT = "generator-source short-circuit current" {
        wordings: ["generator-source symmetrical current at separation"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC/IEEE 62271-37-013 (memory)",
        meaning: "From the generator, symmetrical, at contact separation.",
    }
    GENERATOR_SOURCE_DC_COMPONENT = "generator-source DC component" {
        wordings: ["generator-source asymmetry"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "IEC/IEEE 62271-37-013 (memory)",
        meaning: "DC share of it.",
    }
    STARTING_CURRENT = "starting current" {
        wordings: ["locked-rotor current", "motor starting current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC 62271-110 (memory)",
        meaning: "Of a motor.",
    }
    SURGE_PROTECTION = "surge protection" {
        kind: Kind::WordSet(&words::MITIGATION),
        sense: Set,
        basis: "IEC 62271-110 (memory)",
        meaning: "At the motor, transformer or reactor.",
    }
    PROSPECTIVE_TRV_CURRENT = "prospective TRV current" {
        wordings: ["TRV study current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "The fault current of a studied TRV, of a fault in this circuit.",
    }
    PROSPECTIVE_TRV_PEAK = "prospective TRV peak" {
        wordings: ["TRV study peak"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "The peak found by the study.",
    }
    PROSPECTIVE_TRV_RATE_OF_RISE = "prospective TRV rate of rise" {
        wordings: ["TRV study RRRV"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::VoltageRate], &["kV/us"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "The rate found by the study; if absent, from peak and time.",
    }
    PROSPECTIVE_TRV_TIME_TO_PEAK = "prospective TRV time to peak" {
        wordings: ["TRV study time to peak"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["us"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "From current zero to the peak.",
    }
    PROSPECTIVE_TRV_TIME_T3 = "prospective TRV time t3" {
        wordings: ["TRV study t3"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["us"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "The two-parameter time of the studied wave.",
    }
}
