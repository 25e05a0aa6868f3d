//! What a unit measures, as the trade tells it apart.

/// What a quantity measures. Finer than physics: a fault level in MVA and a reactive power in Mvar are both powers, and a
/// reader who finds one where the other belongs has found a mistake.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Dimension {
    /// A voltage, V.
    Voltage,
    /// A current, A.
    Current,
    /// An apparent power, VA.
    ApparentPower,
    /// An active power, W.
    ActivePower,
    /// A reactive power, var.
    ReactivePower,
    /// A frequency, Hz.
    Frequency,
    /// A time, s.
    Time,
    /// A length, m.
    Length,
    /// A speed, m/s.
    Speed,
    /// A temperature, K.
    Temperature,
    /// A difference of temperatures, K.
    TemperatureDifference,
    /// A pressure, Pa.
    Pressure,
    /// A share, written in percent.
    Share,
    /// A share a year, written in percent a year.
    SharePerYear,
    /// A value per unit of a base.
    PerUnit,
    /// A resistance, reactance or impedance, ohm.
    Impedance,
    /// An impedance a length, ohm/m.
    ImpedancePerLength,
    /// A capacitance, F.
    Capacitance,
    /// A capacitance a length, F/m.
    CapacitancePerLength,
    /// An inductance, H.
    Inductance,
    /// An angle, rad.
    Angle,
    /// A mass, kg.
    Mass,
    /// A volume, m3.
    Volume,
    /// A force, N.
    Force,
    /// An acceleration, m/s2.
    Acceleration,
    /// A power over an area, W/m2.
    Irradiance,
    /// A voltage over a time, V/s.
    VoltageRate,
    /// A length over a voltage, m/V.
    LengthPerVoltage,
    /// A chopping number, A/F^0.5.
    ChoppingNumber,
    /// A count a day, 1/s.
    CountPerDay,
}

impl Dimension {
    /// All of them.
    pub const ALL: [Self; 30] = [
        Self::Voltage,
        Self::Current,
        Self::ApparentPower,
        Self::ActivePower,
        Self::ReactivePower,
        Self::Frequency,
        Self::Time,
        Self::Length,
        Self::Speed,
        Self::Temperature,
        Self::TemperatureDifference,
        Self::Pressure,
        Self::Share,
        Self::SharePerYear,
        Self::PerUnit,
        Self::Impedance,
        Self::ImpedancePerLength,
        Self::Capacitance,
        Self::CapacitancePerLength,
        Self::Inductance,
        Self::Angle,
        Self::Mass,
        Self::Volume,
        Self::Force,
        Self::Acceleration,
        Self::Irradiance,
        Self::VoltageRate,
        Self::LengthPerVoltage,
        Self::ChoppingNumber,
        Self::CountPerDay,
    ];

    /// The plain word for it, to be used in a message.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Voltage => "voltage",
            Self::Current => "current",
            Self::ApparentPower => "apparent power",
            Self::ActivePower => "active power",
            Self::ReactivePower => "reactive power",
            Self::Frequency => "frequency",
            Self::Time => "time",
            Self::Length => "length",
            Self::Speed => "speed",
            Self::Temperature => "temperature",
            Self::TemperatureDifference => "temperature difference",
            Self::Pressure => "pressure",
            Self::Share => "percentage",
            Self::SharePerYear => "percentage a year",
            Self::PerUnit => "per-unit value",
            Self::Impedance => "impedance",
            Self::ImpedancePerLength => "impedance a length",
            Self::Capacitance => "capacitance",
            Self::CapacitancePerLength => "capacitance a length",
            Self::Inductance => "inductance",
            Self::Angle => "angle",
            Self::Mass => "mass",
            Self::Volume => "volume",
            Self::Force => "force",
            Self::Acceleration => "acceleration",
            Self::Irradiance => "power over an area",
            Self::VoltageRate => "voltage over time",
            Self::LengthPerVoltage => "length over voltage",
            Self::ChoppingNumber => "chopping number",
            Self::CountPerDay => "count a day",
        }
    }
}
