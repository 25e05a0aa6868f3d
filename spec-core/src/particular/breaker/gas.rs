//! Particulars of a breaker: gas.

use crate::particular::{Kind, QuantityKind, Tail, particulars, words};
use crate::quantity::Dimension;

particulars! { Breaker, "gas";
    INSULATING_GAS = "insulating gas" {
        wordings: ["gas", "insulating medium", "medium"],
        kind: Kind::Gas,
        sense: Set,
        basis: "IEC 62271-4 (memory)",
        meaning: "What fills the breaker (also breaks the current unless the interrupter is vacuum); a mixture may stand without shares, SF6 + N2, when the bidder is to state them.",
    }
    EXCLUDED_GASES = "excluded gases" {
        wordings: ["media not admitted"],
        kind: Kind::Gases,
        sense: Set,
        basis: "Reg. (EU) 2024/573 (memory)",
        meaning: "What must not be offered.",
    }
    GAS_MASS = "gas mass" {
        wordings: ["mass of gas", "gas quantity"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Mass], &["kg", "lb"])),
        sense: AtMost,
        basis: "IEC 62271-4 (memory)",
        meaning: "In one breaker, three poles.",
    }
    GAS_VOLUME = "gas volume" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Volume], &["l", "m3"])),
        sense: Exact,
        carried: true,
        basis: "common practice, no source",
        meaning: "To compute the mass.",
    }
    GAS_DEROGATION = "gas derogation" {
        wordings: ["derogation"],
        kind: Kind::Text,
        sense: Exact,
        basis: "Reg. (EU) 2024/573 Art. 13 (memory)",
        meaning: "The file that lets a forbidden gas in.",
    }
    RATED_FILLING_PRESSURE = "rated filling pressure" {
        wordings: ["filling pressure", "fill pressure", "rated filling density", "nominal pressure"],
        refused: ["p_re"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Pressure], &["MPa", "bar", "kPa", "psi", "kg/cm2"]).with(Tail::PressureReference)),
        sense: Exact,
        from_duty: true,
        basis: "IEC 62271-1 (memory)",
        meaning: "At 20 degC unless at TEMPERATURE follows.",
    }
    ALARM_PRESSURE = "alarm pressure" {
        wordings: ["alarm level", "low-gas alarm"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Pressure], &["MPa", "bar", "kPa", "psi", "kg/cm2"]).with(Tail::PressureReference)),
        sense: Exact,
        basis: "IEC 62271-1 (memory)",
        meaning: "Where the low-density alarm comes.",
    }
    LOCKOUT_PRESSURE = "lockout pressure" {
        wordings: ["lockout level", "blocking pressure", "lockout"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Pressure], &["MPa", "bar", "kPa", "psi", "kg/cm2"]).with(Tail::PressureReference)),
        sense: Exact,
        basis: "IEC 62271-1 (memory)",
        meaning: "Where closing or opening is blocked; stands for the next line where that is absent.",
    }
    MINIMUM_FUNCTIONAL_PRESSURE = "minimum functional pressure" {
        wordings: ["minimum functional level", "minimum functional density"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Pressure], &["MPa", "bar", "kPa", "psi", "kg/cm2"]).with(Tail::PressureReference)),
        sense: Exact,
        basis: "IEC 62271-1 (memory)",
        meaning: "Down to it all ratings hold; not above the lockout.",
    }
    FILLING_PRESSURE_TOLERANCE = "filling pressure tolerance" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Pressure, Dimension::Share], &["MPa", "%"])),
        sense: Exact,
        carried: true,
        basis: "practice",
        meaning: "Of filling, added in the cold check.",
    }
    GAS_PRESSURE_AT_HIGHEST_AMBIENT = "gas pressure at highest ambient" {
        wordings: ["pressure at maximum temperature"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Pressure], &["MPa", "bar", "kPa", "psi", "kg/cm2"]).with(Tail::PressureReference)),
        sense: AtMost,
        basis: "IEC 62271-1 (memory)",
        meaning: "In the hot.",
    }
    LOW_GAS_ACTION = "low-gas action" {
        wordings: ["action at lockout"],
        kind: Kind::Words { list: &words::LOW_GAS_ACTION, alternatives: false },
        sense: Exact,
        basis: "practice",
        meaning: "What happens at the lockout level.",
    }
    LEAKAGE_RATE = "leakage rate" {
        wordings: ["gas leakage", "leakage"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::SharePerYear], &["%/year"])),
        sense: AtMost,
        basis: "IEC 62271-1 6.16 (memory)",
        meaning: "Relative leakage.",
    }
    GAS_MOISTURE = "gas moisture" {
        wordings: ["moisture dew point", "dew point of the gas"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Temperature], &["degC"])),
        sense: AtMost,
        carried: true,
        basis: "IEC 62271-1 (memory)",
        meaning: "Dew point of water at the rated filling.",
    }
    TANK_HEATERS = "tank heaters" {
        wordings: ["heaters", "gas heaters"],
        kind: Kind::YesNo,
        sense: Exact,
        basis: "practice",
        meaning: "Whether the gas is heated.",
    }
    HEATER_TEMPERATURE_RISE = "heater temperature rise" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::TemperatureDifference], &["K"])),
        sense: AtLeast,
        basis: "practice",
        meaning: "By how much the gas stays above the air.",
    }
    DENSITY_MONITOR = "density monitor" {
        wordings: ["density monitor placement", "gas monitor"],
        kind: Kind::Words { list: &words::DENSITY_MONITOR, alternatives: false },
        sense: Exact,
        basis: "common practice, no source",
        meaning: "Where the monitor takes the temperature by which it turns pressure into density.",
    }
    HEATER_HOLD_TIME = "heater hold time" {
        wordings: ["hold time"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Time], &["h"])),
        sense: AtLeast,
        basis: "practice",
        meaning: "From loss of heating to lockout at the lowest ambient.",
    }
    HEATER_ALARM = "heater alarm" {
        wordings: ["heater supervision"],
        kind: Kind::YesNo,
        sense: Set,
        basis: "practice",
        meaning: "Failure of heating is signalled.",
    }
    TEMPERATURE_CLASS = "temperature class" {
        wordings: ["ambient class", "minimum ambient class"],
        kind: Kind::Words { list: &words::TEMPERATURE_CLASS, alternatives: false },
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "Class of lowest ambient air temperature.",
    }
    LOWEST_SERVICE_TEMPERATURE = "lowest service temperature" {
        wordings: ["lowest ambient", "minimum ambient temperature"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Temperature], &["degC", "degF"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "Down to it all ratings hold.",
    }
    HIGHEST_SERVICE_TEMPERATURE = "highest service temperature" {
        wordings: ["highest ambient", "maximum ambient temperature"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Temperature], &["degC", "degF"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "Up to it all ratings hold.",
    }
    LOW_TEMPERATURE_TEST = "low-temperature test" {
        wordings: ["low-temperature proof", "ratings proven at"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Temperature], &["degC", "degF"])),
        sense: AtMost,
        from_duty: true,
        basis: "IEC 62271-100 (memory)",
        meaning: "Temperature at which the ratings are to be proven with the gas offered.",
    }
    OTHER_COMPARTMENTS_GAS = "other compartments gas" {
        wordings: ["gas of the other compartments"],
        kind: Kind::Gas,
        sense: Set,
        basis: "IEC 62271-203 (memory)",
        meaning: "A second filling, not that of the interrupter.",
    }
    OTHER_COMPARTMENTS_FILLING_PRESSURE = "other compartments filling pressure" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Pressure], &["MPa", "bar", "kPa", "psi", "kg/cm2"]).with(Tail::PressureReference)),
        sense: Exact,
        basis: "IEC 62271-203 (memory)",
        meaning: "Levels of the second filling.",
    }
    OTHER_COMPARTMENTS_ALARM_PRESSURE = "other compartments alarm pressure" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Pressure], &["MPa", "bar", "kPa", "psi", "kg/cm2"]).with(Tail::PressureReference)),
        sense: Exact,
        basis: "IEC 62271-203 (memory)",
        meaning: "Levels of the second filling.",
    }
    OTHER_COMPARTMENTS_LOCKOUT_PRESSURE = "other compartments lockout pressure" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Pressure], &["MPa", "bar", "kPa", "psi", "kg/cm2"]).with(Tail::PressureReference)),
        sense: Exact,
        basis: "IEC 62271-203 (memory)",
        meaning: "Levels of the second filling.",
    }
    OTHER_COMPARTMENTS_MINIMUM_FUNCTIONAL_PRESSURE = "other compartments minimum functional pressure" {
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Pressure], &["MPa", "bar", "kPa", "psi", "kg/cm2"]).with(Tail::PressureReference)),
        sense: Exact,
        basis: "IEC 62271-203 (memory)",
        meaning: "Levels of the second filling.",
    }
    ICE_CLASS = "ice class" {
        wordings: ["ice coating class"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Length], &["mm"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "Ice through which it operates.",
    }
    DESIGN_WIND_SPEED = "design wind speed" {
        wordings: ["wind class"],
        kind: Kind::Quantity(QuantityKind::of(&[Dimension::Speed], &["m/s"])),
        sense: AtLeast,
        from_duty: true,
        basis: "IEC 62271-1 4.1 (memory)",
        meaning: "Wind that it bears.",
    }
}
