//! One number with its unit, as it was written.

use uom::si::f64 as si;

use super::{
    CapacitancePerLength, ChoppingNumber, Dimension, Frequency, ImpedancePerLength, JouleIntegral, LengthPerVoltage,
    Unit, VoltageRate, VoltageRatePerCurrent, canonical, significant,
};

/// A number with its unit, as an author wrote it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Measure {
    /// The number before the unit.
    pub number: f64,
    /// Digits written after the decimal point.
    pub decimals: u8,
    /// The unit.
    pub unit: &'static Unit,
    /// The value in SI base units; unknown for a time in cycles until a frequency is known.
    pub si: Option<f64>,
}

impl Measure {
    /// A number in a unit.
    pub fn new(number: f64, decimals: u8, unit: &'static Unit) -> Self {
        Self { number, decimals, unit, si: unit.to_si(number) }
    }

    /// A value in SI base units, shown in the usual unit of its dimension.
    pub fn from_si(value: f64, dimension: Dimension) -> Self {
        let unit = canonical(dimension);
        Self { number: unit.from_si(value).unwrap_or(value), decimals: 0, unit, si: Some(value) }
    }

    /// What it measures.
    pub const fn dimension(&self) -> Dimension {
        self.unit.dimension
    }

    /// The typed quantity, if this measures it and its value is known.
    pub fn to<Q: Physical>(&self) -> Option<Q> {
        Q::DIMENSIONS.contains(&self.dimension()).then_some(())?;
        self.si.map(Q::from_si)
    }

    /// The same with its cycles turned into seconds.
    #[must_use]
    pub fn with_frequency(mut self, frequency: Frequency) -> Self {
        if self.unit.counts_cycles() {
            self.si = Some(self.number / frequency.value);
        }
        self
    }

    /// Half a unit of the last digit written, in SI base units (a difference, so that a temperature's zero does not matter).
    pub fn half_last_digit(&self) -> f64 {
        let half = 0.5 * 10f64.powi(-i32::from(self.decimals));
        let (Some(here), Some(there)) = (self.si, self.unit.to_si(self.number + half)) else { return 0.0 };
        (there - here).abs()
    }

    /// `value` (SI base units) shown in the unit of this measure, with three significant digits.
    pub fn show_like(&self, value: f64) -> String {
        match self.unit.from_si(value) {
            Some(number) => format!("{} {}", significant(number, 3), self.unit.name),
            None => Self::from_si(value, self.dimension()).to_string(),
        }
    }
}

impl std::fmt::Display for Measure {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        let number = if self.decimals > 0 {
            format!("{:.*}", usize::from(self.decimals), self.number)
        } else if self.number.fract() == 0.0 {
            format!("{:.0}", self.number)
        } else {
            significant(self.number, 3)
        };
        write!(f, "{number} {}", self.unit.name)
    }
}

/// A typed quantity of `uom` that a [`Measure`] can be turned into.
pub trait Physical: Copy {
    /// What it may be read from.
    const DIMENSIONS: &'static [Dimension];
    /// From the value in SI base units.
    fn from_si(value: f64) -> Self;
    /// The value in SI base units.
    fn si(self) -> f64;
    /// How it is shown where no author's unit is known: in the usual unit of the trade, three significant digits.
    fn show(self) -> String {
        let dimension = Self::DIMENSIONS.first().copied().unwrap_or(Dimension::PerUnit);
        let unit = canonical(dimension);
        let number = unit.from_si(self.si()).unwrap_or(self.si());
        if unit.name.is_empty() { significant(number, 3) } else { format!("{} {}", significant(number, 3), unit.name) }
    }
}

macro_rules! physical {
    ($($quantity:ty: $($dimension:ident),+;)*) => {$(
        impl Physical for $quantity {
            const DIMENSIONS: &'static [Dimension] = &[$(Dimension::$dimension),+];
            fn from_si(value: f64) -> Self {
                Self { dimension: std::marker::PhantomData, units: std::marker::PhantomData, value }
            }
            fn si(self) -> f64 {
                self.value
            }
        }
    )*};
}

physical! {
    si::ElectricPotential: Voltage;
    si::ElectricCurrent: Current;
    si::Power: ApparentPower, ActivePower, ReactivePower;
    Frequency: Frequency;
    si::Time: Time;
    si::Length: Length;
    si::Velocity: Speed;
    si::ThermodynamicTemperature: Temperature;
    si::TemperatureInterval: TemperatureDifference;
    si::Pressure: Pressure;
    si::Ratio: PerUnit, Share;
    si::ElectricalResistance: Impedance;
    si::Capacitance: Capacitance;
    si::Inductance: Inductance;
    si::Angle: Angle;
    si::Mass: Mass;
    si::Volume: Volume;
    si::Force: Force;
    si::Acceleration: Acceleration;
    VoltageRate: VoltageRate;
    ImpedancePerLength: ImpedancePerLength;
    CapacitancePerLength: CapacitancePerLength;
    LengthPerVoltage: LengthPerVoltage;
}

impl Physical for ChoppingNumber {
    const DIMENSIONS: &'static [Dimension] = &[Dimension::ChoppingNumber];
    fn from_si(value: f64) -> Self {
        Self(value)
    }
    fn si(self) -> f64 {
        self.0
    }
}

impl Physical for VoltageRatePerCurrent {
    const DIMENSIONS: &'static [Dimension] = &[];
    fn from_si(value: f64) -> Self {
        Self { dimension: std::marker::PhantomData, units: std::marker::PhantomData, value }
    }
    fn si(self) -> f64 {
        self.value
    }
    fn show(self) -> String {
        format!("{} kV/us per kA", significant(self.value / 1e6, 3))
    }
}

impl Physical for JouleIntegral {
    const DIMENSIONS: &'static [Dimension] = &[];
    fn from_si(value: f64) -> Self {
        Self { dimension: std::marker::PhantomData, units: std::marker::PhantomData, value }
    }
    fn si(self) -> f64 {
        self.value
    }
    fn show(self) -> String {
        format!("{} kA2s", significant(self.value / 1e6, 3))
    }
}

impl Physical for si::MassDensity {
    const DIMENSIONS: &'static [Dimension] = &[];
    fn from_si(value: f64) -> Self {
        Self { dimension: std::marker::PhantomData, units: std::marker::PhantomData, value }
    }
    fn si(self) -> f64 {
        self.value
    }
    fn show(self) -> String {
        format!("{} kg/m3", significant(self.value, 3))
    }
}
