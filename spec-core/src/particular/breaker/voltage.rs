//! Particulars of a breaker: voltage and insulation.

use crate::particular::{Extent, Kind, QuantityKind, Tail, particulars, words};
use crate::quantity::{Dimension, Qualifier};

particulars! { Breaker, "voltage and insulation";
    RATED_VOLTAGE = "rated voltage" {
        wordings: ["rated maximum voltage", "maximum voltage"],
        symbols: ["Ur"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 5.2 (memory)",
        meaning: "The highest system voltage it is made for.",
    }
    RATED_FREQUENCY = "rated frequency" {
        wordings: ["rated power frequency"],
        symbols: ["fr"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Frequency], &["Hz"])),
        sense: Exact,
        from_duty: true,
        basis: "IEC 62271-1 5.4 (memory)",
        meaning: "Must be the system's.",
    }
    RATED_SHORT_DURATION_POWER_FREQUENCY_WITHSTAND_VOLTAGE = "rated short-duration power-frequency withstand voltage" {
        wordings: ["rated power-frequency withstand voltage", "power-frequency withstand", "low-frequency withstand", "1 min withstand"],
        symbols: ["Ud"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 5.3 (memory)",
        meaning: "One-minute voltage to earth and between phases.",
    }
    POWER_FREQUENCY_WITHSTAND_VOLTAGE_ACROSS_THE_OPEN_BREAKER = "power-frequency withstand voltage across the open breaker" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        basis: "IEC 62271-1 5.3 (memory)",
        meaning: "Across the open gap, only where it differs.",
    }
    RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE = "rated lightning impulse withstand voltage" {
        wordings: ["lightning impulse withstand", "BIL", "basic impulse level", "full-wave withstand", "full wave"],
        symbols: ["Up"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 5.3 (memory)",
        meaning: "1.2/50 us voltage to earth and between phases, at the standard atmosphere.",
    }
    LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE_ACROSS_THE_OPEN_BREAKER = "lightning impulse withstand voltage across the open breaker" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak).extending(Extent::Sum)),
        sense: AtLeast,
        basis: "IEC 62271-1 5.3 (memory)",
        meaning: "Across the open gap; a biased value belongs to a disconnecting breaker.",
    }
    RATED_SWITCHING_IMPULSE_WITHSTAND_VOLTAGE = "rated switching impulse withstand voltage" {
        wordings: ["rated switching impulse withstand voltage phase to earth", "switching impulse withstand", "BSL"],
        refused: ["Us"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 5.3 (memory)",
        meaning: "250/2500 us voltage to earth, from 300 kV up.",
    }
    SWITCHING_IMPULSE_WITHSTAND_VOLTAGE_BETWEEN_PHASES = "switching impulse withstand voltage between phases" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        basis: "IEC 62271-1 5.3 (memory)",
        meaning: "Between phases.",
    }
    SWITCHING_IMPULSE_WITHSTAND_VOLTAGE_ACROSS_THE_OPEN_BREAKER = "switching impulse withstand voltage across the open breaker" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak).extending(Extent::Sum)),
        sense: AtLeast,
        basis: "IEC 62271-1 5.3 (memory)",
        meaning: "Across the open gap.",
    }
    INSULATION_STATED_FOR = "insulation stated for" {
        wordings: ["insulation level stated for"],
        kind: Kind::Words { list: &words::INSULATION_STATED_FOR, alternatives: false },
        sense: Exact,
        basis: "IEC 62271-1 4.2 (memory)",
        meaning: "What air the stated levels are for; absent: the standard atmosphere.",
    }
    EXTERNAL_INSULATION = "external insulation" {
        wordings: ["air insulation"],
        kind: Kind::Words { list: &words::EXTERNAL_INSULATION, alternatives: false },
        sense: Exact,
        basis: "IEC 62271-1 4.2 (memory)",
        meaning: "Which insulation stands in the air of the site; absent: from the construction.",
    }
    CHOPPED_WAVE_WITHSTAND_VOLTAGE = "chopped-wave withstand voltage" {
        wordings: ["chopped wave", "chopped impulse withstand"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        basis: "IEEE C37.06-1987 (memory)",
        meaning: "Of older editions only.",
    }
    CREEPAGE_DISTANCE = "creepage distance" {
        wordings: ["total creepage distance", "creepage", "leakage distance"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["mm", "in"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 60815 (memory)",
        meaning: "Total length along the surface, phase to earth.",
    }
    CREEPAGE_DISTANCE_ACROSS_THE_OPEN_BREAKER = "creepage distance across the open breaker" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["mm", "in"])),
        sense: AtLeast,
        carried: true,
        basis: "IEC 60815 (memory)",
        meaning: "Over the interrupter's insulator.",
    }
    SPECIFIC_CREEPAGE_DISTANCE = "specific creepage distance" {
        wordings: ["specific creepage", "SCD"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::LengthPerVoltage], &["mm/kV", "in/kV"]).with(Tail::DividingVoltage)),
        sense: AtLeast,
        basis: "IEC 60815:1986 and :2008 (memory)",
        meaning: "Creepage a kilovolt; the words say which voltage divides it, and without them it is an omission.",
    }
    UNIFIED_SPECIFIC_CREEPAGE_DISTANCE = "unified specific creepage distance" {
        wordings: ["USCD"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::LengthPerVoltage], &["mm/kV"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 60815-1:2008 (memory)",
        meaning: "Creepage over Ur/sqrt3; no words needed.",
    }
    INSULATOR_MATERIAL = "insulator material" {
        wordings: ["housing material"],
        kind: Kind::Words { list: &words::INSULATOR_MATERIAL, alternatives: false },
        sense: Set,
        basis: "IEC 60815-2, -3 (memory)",
        meaning: "What the hollow insulators are made of.",
    }
    INSULATOR_DIAMETER = "insulator diameter" {
        wordings: ["average insulator diameter"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["mm"])),
        sense: Exact,
        basis: "IEC 60815 (memory)",
        meaning: "Mean diameter, above 300 mm the creepage grows.",
    }
    DIAMETER_CORRECTION_FACTOR = "diameter correction factor" {
        symbols: ["Kad"],
        kind: Kind::Ratio,
        sense: Exact,
        basis: "IEC 60815 (memory)",
        meaning: "Factor on the creepage, where the buyer sets it.",
    }
    RADIO_INTERFERENCE_VOLTAGE = "radio interference voltage" {
        wordings: ["RIV", "radio influence voltage", "RIV limit"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["uV"])),
        sense: AtMost,
        basis: "IEC 62271-1 7.3 (memory)",
        meaning: "Limit at 1.1 Ur/sqrt3.",
    }
    CORONA_EXTINCTION_VOLTAGE = "corona extinction voltage" {
        wordings: ["corona inception voltage"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        carried: true,
        basis: "IEC 62271-1 (memory)",
        meaning: "Below it no visible corona.",
    }
    PHASE_SPACING = "phase spacing" {
        wordings: ["pole spacing", "phase-to-phase spacing"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["mm"])),
        sense: AtLeast,
        basis: "IEC 60071-2, 61936-1 (memory)",
        meaning: "Centre line to centre line.",
    }
    AUXILIARY_CIRCUIT_WITHSTAND_VOLTAGE = "auxiliary circuit withstand voltage" {
        wordings: ["insulation of auxiliary circuits"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        basis: "IEC 62271-1 (memory)",
        meaning: "One-minute voltage of the low-voltage circuits.",
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
}
