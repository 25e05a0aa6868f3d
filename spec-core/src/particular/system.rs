//! Particulars of the sheet `system`. The network at the connection point.

use crate::particular::{Kind, QuantityKind, Tail, particulars, words};
use crate::quantity::{Dimension, Qualifier};

particulars! { System, "system";
    NOMINAL_VOLTAGE = "nominal voltage" {
        wordings: ["nominal system voltage", "nominal voltage of the system"],
        symbols: ["Un"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"])),
        sense: Exact,
        basis: "IEC 60038 (memory)",
        meaning: "The round value that names the system.",
    }
    HIGHEST_VOLTAGE = "highest voltage" {
        wordings: ["highest system voltage", "maximum system voltage", "highest voltage for equipment", "maximum voltage"],
        symbols: ["Um"],
        refused: ["Us"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"])),
        sense: Exact,
        basis: "IEC 60038, 62271-1 (memory)",
        meaning: "The highest rms phase-to-phase voltage in normal operation.",
    }
    FREQUENCY = "frequency" {
        wordings: ["system frequency", "power frequency"],
        symbols: ["f"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Frequency], &["Hz"])),
        sense: Exact,
        basis: "IEC 62271-1 (memory)",
        meaning: "The frequency of the system.",
    }
    FREQUENCY_TOLERANCE = "frequency tolerance" {
        wordings: ["frequency variation"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        basis: "practice",
        meaning: "The band about the frequency; never a second frequency.",
    }
    VOLTAGE_TOLERANCE = "voltage tolerance" {
        wordings: ["voltage variation"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Share], &["%"])),
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "The band about the nominal voltage.",
    }
    VOLTAGE_FACTOR = "voltage factor" {
        wordings: ["c factor"],
        symbols: ["c"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Other than the standard's cmax, for currents that follow from infeeds; where cmax Un would pass the highest voltage.",
    }
    NEUTRAL = "neutral" {
        wordings: ["neutral earthing", "neutral grounding", "earthing of the neutral", "grounding", "system earthing", "system grounding"],
        kind: Kind::Words { list: &words::NEUTRAL, alternatives: false },
        sense: Exact,
        basis: "IEC 60071-1, 62271-100 (memory)",
        meaning: "How the neutral is earthed in every operating state; decides kpp, kc and the out-of-phase factor.",
    }
    EARTH_FAULT_CURRENT = "earth-fault current" {
        wordings: ["ground-fault current", "neutral resistor current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["A"])),
        sense: AtMost,
        basis: "practice",
        meaning: "The current to which an impedance in the neutral limits an earth fault.",
    }
    EARTH_FAULT_FACTOR = "earth-fault factor" {
        symbols: ["k"],
        kind: Kind::Ratio,
        sense: AtMost,
        basis: "IEC 60071-1 (memory)",
        meaning: "The rise of the sound phases during an earth fault; 1.4 or less means effectively earthed.",
    }
    X0_OVER_X1 = "X0/X1" {
        wordings: ["zero-sequence to positive-sequence reactance ratio"],
        symbols: ["X0/X1"],
        kind: Kind::Ratio,
        sense: AtMost,
        basis: "IEC 62271-100, 306 (memory)",
        meaning: "Reactance ratio at the connection point, largest of all operating states.",
    }
    R0_OVER_X1 = "R0/X1" {
        wordings: ["zero-sequence resistance to positive-sequence reactance ratio"],
        symbols: ["R0/X1"],
        kind: Kind::Ratio,
        sense: AtMost,
        basis: "IEC 60071-1 (memory)",
        meaning: "Resistance ratio at the connection point, largest of all operating states.",
    }
    Z0_OVER_Z1 = "Z0/Z1" {
        wordings: ["zero-sequence to positive-sequence impedance ratio"],
        symbols: ["Z0/Z1"],
        kind: Kind::Ratio,
        sense: AtMost,
        basis: "IEC 60909 (memory)",
        meaning: "Impedance ratio, where the two ratios above are not known apart.",
    }
    SHORT_CIRCUIT_CURRENT = "short-circuit current" {
        wordings: ["initial symmetrical short-circuit current", "initial short-circuit current", "initial three-phase short-circuit current", "three-phase short-circuit current", "three-phase fault current", "symmetrical fault current", "symmetrical three-phase fault current", "fault current", "system-source short-circuit current"],
        symbols: ["Ik3", "Ik\""],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The largest initial symmetrical three-phase short-circuit current at the connection point.",
    }
    SINGLE_PHASE_SHORT_CIRCUIT_CURRENT = "single-phase short-circuit current" {
        wordings: ["initial single-phase short-circuit current", "line-to-earth short-circuit current", "single-phase fault current", "symmetrical single-phase fault current", "earth-fault level"],
        symbols: ["Ik1"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The largest initial line-to-earth short-circuit current; it governs where it is the larger.",
    }
    TWO_PHASE_TO_EARTH_SHORT_CIRCUIT_CURRENT = "two-phase-to-earth short-circuit current" {
        wordings: ["double line-to-ground fault current"],
        symbols: ["Ik2E"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The largest line current of a two-phase fault to earth.",
    }
    FAULT_LEVEL = "fault level" {
        wordings: ["short-circuit power", "short-circuit level", "fault MVA"],
        symbols: ["Sk\""],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::ApparentPower], &["MVA", "GVA"]).with(Tail::AtVoltage)),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The short-circuit power with the voltage that it was multiplied with; without the voltage it is ambiguous.",
    }
    PEAK_SHORT_CIRCUIT_CURRENT = "peak short-circuit current" {
        wordings: ["peak fault current", "crest fault current", "first-cycle peak current"],
        symbols: ["ip"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Peak)),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The largest instantaneous value; if absent it is computed.",
    }
    SYMMETRICAL_SHORT_CIRCUIT_BREAKING_CURRENT = "symmetrical short-circuit breaking current" {
        wordings: ["decayed short-circuit current", "interrupting duty"],
        symbols: ["Ib"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The symmetrical current left at contact separation; counts only with the time below.",
    }
    MINIMUM_TIME_DELAY = "minimum time delay" {
        wordings: ["time delay of the breaking current", "minimum contact-parting time"],
        symbols: ["tmin"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["s"])),
        sense: AtLeast,
        basis: "IEC 60909-0 (memory)",
        meaning: "From fault to contact separation, relay included, for the current above.",
    }
    STEADY_STATE_SHORT_CIRCUIT_CURRENT = "steady-state short-circuit current" {
        wordings: ["sustained short-circuit current"],
        refused: ["Ik"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        carried: true,
        basis: "IEC 60909-0 (memory)",
        meaning: "The current after decay; its symbol is refused, since the rating has it too.",
    }
    THERMAL_EQUIVALENT_SHORT_CIRCUIT_CURRENT = "thermal equivalent short-circuit current" {
        symbols: ["Ith"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The current of equal heat over the backup clearing time; if absent it is computed.",
    }
    X_OVER_R = "X/R" {
        wordings: ["X/R ratio", "reactance to resistance ratio"],
        symbols: ["X/R"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEC 60909-0, IEEE C37.010 (memory)",
        meaning: "Reactance to resistance at the connection point.",
    }
    R_OVER_X = "R/X" {
        wordings: ["R/X ratio"],
        symbols: ["R/X"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "The reciprocal; both together must agree.",
    }
    DC_TIME_CONSTANT = "DC time constant" {
        wordings: ["DC time constant of the network", "network time constant", "time constant", "time constant of the DC component"],
        symbols: ["tau"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: Exact,
        basis: "IEC 62271-100 (memory)",
        meaning: "How fast the DC component of the fault current decays; must agree with X/R where both stand.",
    }
    STUDY_YEAR = "study year" {
        wordings: ["horizon year", "year of the short-circuit level"],
        kind: Kind::Year,
        sense: Exact,
        basis: "practice",
        meaning: "The planning year for which the level holds.",
    }
    GROWTH_OF_SHORT_CIRCUIT_CURRENT = "growth of short-circuit current" {
        wordings: ["fault-level growth"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::SharePerYear], &["%/year"])),
        sense: Exact,
        basis: "practice",
        meaning: "Growth to be added until the end of the service life.",
    }
    LEVEL_VALID_WITH = "level valid with" {
        wordings: ["source configuration", "operating state", "switching state"],
        kind: Kind::Words { list: &words::LEVEL_VALID_WITH, alternatives: false },
        sense: Exact,
        basis: "practice",
        meaning: "The switching state for which the level holds; an open section needs an interlock.",
    }
    INTERLOCKED = "interlocked" {
        wordings: ["interlock of the operating state"],
        kind: Kind::YesNo,
        sense: Exact,
        basis: "practice",
        meaning: "Whether the switching state above is held by an interlock.",
    }
    MOTORS_COUNTED = "motors counted" {
        wordings: ["motor contribution included"],
        kind: Kind::YesNo,
        sense: Exact,
        basis: "IEC 60909-0 (memory)",
        meaning: "Whether the level contains the motors.",
    }
    CONNECTION = "connection" {
        wordings: ["network kind", "kind of network", "connected by"],
        kind: Kind::Words { list: &words::CONNECTION, alternatives: false },
        sense: Exact,
        basis: "IEC 62271-100 S1/S2 (memory)",
        meaning: "What leaves the busbar; decides S1 or S2 below 100 kV.",
    }
    BACKUP_CLEARING_TIME = "backup clearing time" {
        wordings: ["backup fault clearing time", "longest fault clearing time", "fault duration"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["s"])),
        sense: AtMost,
        basis: "practice",
        meaning: "The longest time that a fault may last; the heat is counted over it.",
    }
    RELAY_TIME = "relay time" {
        wordings: ["protection operating time", "relay operating time"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: AtMost,
        basis: "practice",
        meaning: "From fault to trip impulse.",
    }
    CRITICAL_CLEARING_TIME = "critical clearing time" {
        wordings: ["permissible clearing time", "stability limit"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: AtMost,
        basis: "practice",
        meaning: "The longest time from fault to interruption that stability allows.",
    }
    BREAKER_FAILURE_TIME = "breaker-failure time" {
        wordings: ["breaker failure clearing time", "50BF time"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["ms"])),
        sense: AtMost,
        basis: "practice",
        meaning: "When neighbouring breakers must have cleared if this one fails.",
    }
    LIGHTNING_IMPULSE_LEVEL_NEEDED_ON_SITE = "lightning impulse level needed on site" {
        wordings: ["lightning level needed on site", "insulation level needed on site"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        basis: "IEC 60071-1 (memory)",
        meaning: "What the insulation must hold in the air of the site, before the altitude correction; also in a breaker.",
    }
    POWER_FREQUENCY_LEVEL_NEEDED_ON_SITE = "power-frequency level needed on site" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        basis: "IEC 60071-1 (memory)",
        meaning: "The same for the one-minute voltage; also in a breaker.",
    }
    SWITCHING_IMPULSE_LEVEL_NEEDED_ON_SITE = "switching impulse level needed on site" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        basis: "IEC 60071-1 (memory)",
        meaning: "The same for the switching impulse; also in a breaker.",
    }
    ARRESTER_LIGHTNING_PROTECTIVE_LEVEL = "arrester lightning protective level" {
        wordings: ["lightning protective level"],
        symbols: ["Upl"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtMost,
        basis: "IEC 60071-1 (memory)",
        meaning: "What the arresters leave of a lightning surge.",
    }
    ARRESTER_SWITCHING_PROTECTIVE_LEVEL = "arrester switching protective level" {
        wordings: ["switching protective level"],
        symbols: ["Ups"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtMost,
        basis: "IEC 60071-1 (memory)",
        meaning: "What the arresters leave of a switching surge.",
    }
    PERMISSIBLE_SWITCHING_OVERVOLTAGE = "permissible switching overvoltage" {
        wordings: ["switching overvoltage limit"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage, Dimension::PerUnit], &["kV", "pu"]).as_(Qualifier::Peak)),
        sense: AtMost,
        basis: "IEC 60071 (memory)",
        meaning: "The limit that a switching-surge study asks for.",
    }
    CAPACITANCE_AT_THE_BUSBAR = "capacitance at the busbar" {
        wordings: ["bus capacitance", "local capacitance"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Capacitance], &["nF"])),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "Capacitance to earth next to the breaker; delays the TRV.",
    }
    PROSPECTIVE_TRV_CURRENT = "prospective TRV current" {
        wordings: ["TRV study current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: Exact,
        basis: "IEEE C37.011 (memory)",
        meaning: "The fault current of a studied TRV; all lines prospective TRV ... may stand in a system (bus fault) and in a circuit (a fault in it).",
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
