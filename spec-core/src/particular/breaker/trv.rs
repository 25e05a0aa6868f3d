//! Particulars of a breaker: TRV and fault duties.

use crate::particular::{Kind, QuantityKind, particulars, words};
use crate::quantity::{Dimension, Qualifier};

particulars! { Breaker, "TRV and fault duties";
    FIRST_POLE_TO_CLEAR_FACTOR = "first-pole-to-clear factor" {
        wordings: ["rated first-pole-to-clear factor"],
        symbols: ["kpp"],
        kind: Kind::Ratio,
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 5.102 (memory)",
        meaning: "1.2, 1.3 or 1.5.",
    }
    T100_TRV_PEAK = "T100 TRV peak" {
        wordings: ["T100 uc", "TRV peak", "rated TRV"],
        symbols: ["uc"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Peak of the envelope of that duty.",
    }
    T60_TRV_PEAK = "T60 TRV peak" {
        wordings: ["T60 uc"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Peak of the envelope of that duty.",
    }
    T30_TRV_PEAK = "T30 TRV peak" {
        wordings: ["T30 uc"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Peak of the envelope of that duty.",
    }
    T10_TRV_PEAK = "T10 TRV peak" {
        wordings: ["T10 uc"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Peak of the envelope of that duty.",
    }
    OP_TRV_PEAK = "OP TRV peak" {
        wordings: ["OP uc", "out-of-phase TRV peak"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Peak of the envelope of that duty.",
    }
    T100_RATE_OF_RISE = "T100 rate of rise" {
        wordings: ["T100 RRRV", "RRRV", "rate of rise", "rate of rise of recovery voltage"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::VoltageRate], &["kV/us"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "u1/t1 or uc/t3 of that duty.",
    }
    T60_RATE_OF_RISE = "T60 rate of rise" {
        wordings: ["T60 RRRV"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::VoltageRate], &["kV/us"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "u1/t1 or uc/t3 of that duty.",
    }
    T30_RATE_OF_RISE = "T30 rate of rise" {
        wordings: ["T30 RRRV"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::VoltageRate], &["kV/us"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "u1/t1 or uc/t3 of that duty.",
    }
    T10_RATE_OF_RISE = "T10 rate of rise" {
        wordings: ["T10 RRRV"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::VoltageRate], &["kV/us"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "u1/t1 or uc/t3 of that duty.",
    }
    OP_RATE_OF_RISE = "OP rate of rise" {
        wordings: ["OP RRRV"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::VoltageRate], &["kV/us"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "u1/t1 or uc/t3 of that duty.",
    }
    T100_AMPLITUDE_FACTOR = "T100 amplitude factor" {
        wordings: ["T100 kaf", "amplitude factor"],
        symbols: ["kaf"],
        kind: Kind::Ratio,
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Peak of the envelope over the crest of the recovery voltage.",
    }
    T60_AMPLITUDE_FACTOR = "T60 amplitude factor" {
        wordings: ["T60 kaf"],
        kind: Kind::Ratio,
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Peak of the envelope over the crest of the recovery voltage.",
    }
    T30_AMPLITUDE_FACTOR = "T30 amplitude factor" {
        wordings: ["T30 kaf"],
        kind: Kind::Ratio,
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Peak of the envelope over the crest of the recovery voltage.",
    }
    T10_AMPLITUDE_FACTOR = "T10 amplitude factor" {
        wordings: ["T10 kaf"],
        kind: Kind::Ratio,
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Peak of the envelope over the crest of the recovery voltage.",
    }
    OP_AMPLITUDE_FACTOR = "OP amplitude factor" {
        wordings: ["OP kaf"],
        kind: Kind::Ratio,
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Peak of the envelope over the crest of the recovery voltage.",
    }
    T100_TIME_T3 = "T100 time t3" {
        wordings: ["T100 t3"],
        symbols: ["t3"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["us"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Two-parameter time.",
    }
    T60_TIME_T3 = "T60 time t3" {
        wordings: ["T60 t3"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["us"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Two-parameter time.",
    }
    T30_TIME_T3 = "T30 time t3" {
        wordings: ["T30 t3"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["us"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Two-parameter time.",
    }
    T10_TIME_T3 = "T10 time t3" {
        wordings: ["T10 t3"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["us"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Two-parameter time.",
    }
    OP_TIME_T3 = "OP time t3" {
        wordings: ["OP t3"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["us"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Two-parameter time.",
    }
    T100_FIRST_REFERENCE_VOLTAGE = "T100 first reference voltage" {
        wordings: ["T100 u1"],
        symbols: ["u1"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Four-parameter envelope, from 100 kV up.",
    }
    T60_FIRST_REFERENCE_VOLTAGE = "T60 first reference voltage" {
        wordings: ["T60 u1"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Four-parameter envelope, from 100 kV up.",
    }
    T100_TIME_T1 = "T100 time t1" {
        wordings: ["T100 t1"],
        symbols: ["t1"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["us"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Four-parameter envelope.",
    }
    T60_TIME_T1 = "T60 time t1" {
        wordings: ["T60 t1"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["us"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Four-parameter envelope.",
    }
    SHORT_LINE_FAULT = "short-line fault" {
        wordings: ["short-line fault rating", "SLF", "kilometric fault"],
        kind: Kind::YesNo,
        sense: Set,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Whether the rating is asked for.",
    }
    SHORT_LINE_FAULT_DUTIES = "short-line fault duties" {
        wordings: ["SLF duties"],
        kind: Kind::WordSet(&words::SHORT_LINE_FAULT_DUTIES),
        sense: Set,
        basis: "IEC 62271-100 (memory)",
        meaning: "Which ones.",
    }
    SHORT_LINE_FAULT_SURGE_IMPEDANCE = "short-line fault surge impedance" {
        wordings: ["surge impedance of the line"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Impedance], &["ohm"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "450 ohm by the standard.",
    }
    SHORT_LINE_FAULT_PEAK_FACTOR = "short-line fault peak factor" {
        kind: Kind::Ratio,
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "1.6 by the standard.",
    }
    INITIAL_TRV = "initial TRV" {
        wordings: ["ITRV"],
        kind: Kind::YesNo,
        sense: Set,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Whether it is asked for.",
    }
    RATED_OUT_OF_PHASE_BREAKING_CURRENT = "rated out-of-phase breaking current" {
        wordings: ["out-of-phase breaking current", "out-of-phase switching current", "out-of-phase making and breaking current"],
        refused: ["Id"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 5.105 (memory)",
        meaning: "A quarter of Isc by the standard.",
    }
    OUT_OF_PHASE_VOLTAGE_FACTOR = "out-of-phase voltage factor" {
        wordings: ["out-of-phase factor"],
        kind: Kind::Ratio,
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-100 5.105 (memory)",
        meaning: "2.0 or 2.5.",
    }
    OUT_OF_PHASE_ANGLE = "out-of-phase angle" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Angle], &["deg"])),
        sense: AtLeast,
        basis: "IEC/IEEE 62271-37-013 (memory)",
        meaning: "90 or 180 degrees, of a generator breaker.",
    }
    TRANSFORMER_LIMITED_FAULT = "transformer-limited fault" {
        wordings: ["transformer-fed fault", "TLF"],
        kind: Kind::YesNo,
        sense: Set,
        basis: "IEEE C37.011, C37.06.1 (memory)",
        meaning: "Whether faster TRV values for it are asked for.",
    }
    TRANSFORMER_LIMITED_FAULT_BREAKING_CURRENT = "transformer-limited fault breaking current" {
        wordings: ["TLF current"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Current], &["kA"]).as_(Qualifier::Rms)),
        sense: AtLeast,
        basis: "IEEE C37.011 (memory)",
        meaning: "Current of that rating.",
    }
    TRANSFORMER_LIMITED_FAULT_TRV_PEAK = "transformer-limited fault TRV peak" {
        wordings: ["TLF uc"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Voltage], &["kV"]).as_(Qualifier::Peak)),
        sense: AtLeast,
        basis: "IEEE C37.011 (memory)",
        meaning: "Peak of that rating.",
    }
    TRANSFORMER_LIMITED_FAULT_TIME_T3 = "transformer-limited fault time t3" {
        wordings: ["TLF t3"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["us"])),
        sense: AtMost,
        basis: "IEEE C37.011 (memory)",
        meaning: "Time of that rating.",
    }
    FAST_TRV_CLASS = "fast TRV class" {
        wordings: ["definite-purpose fast transient"],
        kind: Kind::YesNo,
        sense: Set,
        basis: "IEEE C37.06.1 (memory)",
        meaning: "Whether the definite-purpose class is asked for.",
    }
    TRV_MITIGATION = "TRV mitigation" {
        kind: Kind::WordSet(&words::MITIGATION),
        sense: Set,
        basis: "IEEE C37.011 (memory)",
        meaning: "What slows the TRV.",
    }
    GRADING_CAPACITANCE = "grading capacitance" {
        wordings: ["grading capacitor"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Capacitance], &["pF", "nF"])),
        sense: AtLeast,
        carried: true,
        basis: "IEC 62146 (memory)",
        meaning: "Across each break.",
    }
}
