//! The table of units and the spellings that they are accepted in.
//!
//! Factors come from the `uom` library, so that they are checked outside of this project; only the few units that it does not
//! have are defined here, from those that it has.

use std::borrow::Cow;
use std::sync::LazyLock;

use uom::si;
use uom::si::f64 as q;

use super::Dimension;

/// To SI base units, and back.
type Scale = (fn(f64) -> f64, fn(f64) -> f64);

/// A unit of the table.
#[derive(Debug)]
pub struct Unit {
    /// How it is written by us.
    pub name: &'static str,
    /// What it measures.
    pub dimension: Dimension,
    spellings: &'static [&'static str],
    /// Value in SI base units of a number of these units; absent for cycles, which need a frequency.
    scale: Option<Scale>,
}

impl PartialEq for Unit {
    fn eq(&self, other: &Self) -> bool {
        self.dimension == other.dimension && self.name == other.name
    }
}

impl Unit {
    /// `number` of these units in SI base units.
    pub fn to_si(&self, number: f64) -> Option<f64> {
        self.scale.map(|(to, _)| to(number))
    }

    /// `value` in SI base units as a number of these units.
    pub fn from_si(&self, value: f64) -> Option<f64> {
        self.scale.map(|(_, from)| from(value))
    }

    /// Whether it is a number of periods of the system's frequency.
    pub const fn counts_cycles(&self) -> bool {
        self.scale.is_none()
    }
}

/// Words that belong to a unit and say which kind of value it is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Qualifier {
    /// Root mean square, or symmetrical.
    Rms,
    /// Peak, crest.
    Peak,
    /// Direct.
    Dc,
    /// Alternating.
    Ac,
    /// Absolute pressure.
    Absolute,
    /// Pressure above that of the air.
    Gauge,
    /// A length divided by the phase-to-phase voltage.
    PhaseToPhase,
    /// A length divided by the phase-to-earth voltage.
    PhaseToEarth,
}

impl Qualifier {
    /// The word as we write it.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Rms => "rms",
            Self::Peak => "peak",
            Self::Dc => "DC",
            Self::Ac => "AC",
            Self::Absolute => "abs",
            Self::Gauge => "gauge",
            Self::PhaseToPhase => "phase-to-phase",
            Self::PhaseToEarth => "phase-to-earth",
        }
    }

    /// The qualifier that a word stands for.
    pub fn read(word: &str) -> Option<Self> {
        let plain: String =
            word.chars().filter(|c| !matches!(c, '.' | '(' | ')')).collect::<String>().to_ascii_lowercase();
        Some(match plain.as_str() {
            "rms" | "r" | "sym" | "symmetrical" => Self::Rms,
            "peak" | "pk" | "crest" | "p" => Self::Peak,
            "dc" => Self::Dc,
            "ac" => Self::Ac,
            "abs" | "absolute" | "a" => Self::Absolute,
            "gauge" | "gage" | "g" | "rel" | "relative" => Self::Gauge,
            "phase-to-phase" | "phase-phase" | "ph-ph" | "line-to-line" => Self::PhaseToPhase,
            "phase-to-earth" | "phase-earth" | "phase-to-ground" | "ph-e" | "line-to-ground" => Self::PhaseToEarth,
            _ => return None,
        })
    }
}

/// A unit as it was spelt: with what the spelling itself says (`kVp`, `psig`).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SpeltUnit {
    /// The unit.
    pub unit: &'static Unit,
    /// The kind of value that the spelling carries.
    pub qualifier: Option<Qualifier>,
}

macro_rules! unit {
    ($dimension:ident, $name:literal, [$($spelling:literal),*], $quantity:ident, $module:ident :: $unit:ident) => {
        Unit {
            name: $name,
            dimension: Dimension::$dimension,
            spellings: &[$name, $($spelling),*],
            scale: Some((
                |number| q::$quantity::new::<si::$module::$unit>(number).value,
                |value| <q::$quantity as super::Physical>::from_si(value).get::<si::$module::$unit>(),
            )),
        }
    };
    ($dimension:ident, $name:literal, [$($spelling:literal),*], $factor:expr) => {
        Unit {
            name: $name,
            dimension: Dimension::$dimension,
            spellings: &[$name, $($spelling),*],
            scale: Some((|number| number * $factor, |value| value / $factor)),
        }
    };
}

const YEAR: f64 = 365.25 * 86_400.0; // Julian year, as in IAU recommendations; only for counting operations and ages
const MILE: f64 = 1609.344; // international mile, exact by definition

/// The first unit of a dimension is the one that we show it in.
static UNITS: &[Unit] = &[
    unit!(Voltage, "kV", [], ElectricPotential, electric_potential::kilovolt),
    unit!(Voltage, "V", ["volt", "volts"], ElectricPotential, electric_potential::volt),
    unit!(Voltage, "MV", [], ElectricPotential, electric_potential::megavolt),
    unit!(Voltage, "uV", [], ElectricPotential, electric_potential::microvolt),
    unit!(Voltage, "mV", [], ElectricPotential, electric_potential::millivolt),
    unit!(Current, "kA", [], ElectricCurrent, electric_current::kiloampere),
    unit!(Current, "A", ["amp", "amps", "ampere", "amperes"], ElectricCurrent, electric_current::ampere),
    unit!(Current, "mA", [], ElectricCurrent, electric_current::milliampere),
    unit!(ApparentPower, "MVA", [], Power, power::megawatt),
    unit!(ApparentPower, "GVA", [], Power, power::gigawatt),
    unit!(ApparentPower, "kVA", [], Power, power::kilowatt),
    unit!(ApparentPower, "VA", [], Power, power::watt),
    unit!(ActivePower, "MW", [], Power, power::megawatt),
    unit!(ActivePower, "kW", [], Power, power::kilowatt),
    unit!(ActivePower, "W", [], Power, power::watt),
    unit!(ReactivePower, "Mvar", ["MVAr", "MVAR"], Power, power::megawatt),
    unit!(ReactivePower, "kvar", ["kVAr", "kVAR"], Power, power::kilowatt),
    unit!(Frequency, "Hz", ["c/s", "cps"], Frequency, frequency::hertz),
    unit!(Frequency, "kHz", [], Frequency, frequency::kilohertz),
    unit!(Frequency, "MHz", [], Frequency, frequency::megahertz),
    unit!(Time, "ms", ["msec", "millisecond", "milliseconds"], Time, time::millisecond),
    unit!(Time, "s", ["sec", "secs", "second", "seconds"], Time, time::second),
    unit!(Time, "min", ["mins", "minute", "minutes"], Time, time::minute),
    unit!(Time, "h", ["hr", "hrs", "hour", "hours"], Time, time::hour),
    unit!(Time, "us", ["usec", "microsecond", "microseconds"], Time, time::microsecond),
    unit!(Time, "days", ["day", "d"], Time, time::day),
    unit!(Time, "months", ["month"], YEAR / 12.0),
    unit!(Time, "years", ["year", "yr", "yrs", "a"], YEAR),
    Unit { name: "cycles", dimension: Dimension::Time, spellings: &["cycles", "cycle", "cy"], scale: None },
    unit!(Length, "m", ["metre", "metres", "meter", "meters"], Length, length::meter),
    unit!(Length, "mm", [], Length, length::millimeter),
    unit!(Length, "cm", [], Length, length::centimeter),
    unit!(Length, "km", [], Length, length::kilometer),
    unit!(Length, "um", ["micron", "microns"], Length, length::micrometer),
    unit!(Length, "in", ["inch", "inches"], Length, length::inch),
    unit!(Length, "ft", ["foot", "feet"], Length, length::foot),
    unit!(Length, "mi", ["mile", "miles"], Length, length::mile),
    unit!(Speed, "m/s", [], Velocity, velocity::meter_per_second),
    unit!(Speed, "km/h", ["kmh", "kph"], Velocity, velocity::kilometer_per_hour),
    unit!(Speed, "mph", [], Velocity, velocity::mile_per_hour),
    unit!(
        Temperature,
        "degC",
        ["C", "deg.C", "degreesC", "celsius"],
        ThermodynamicTemperature,
        thermodynamic_temperature::degree_celsius
    ),
    unit!(
        Temperature,
        "degF",
        ["F", "deg.F", "fahrenheit"],
        ThermodynamicTemperature,
        thermodynamic_temperature::degree_fahrenheit
    ),
    unit!(Temperature, "K", ["kelvin"], ThermodynamicTemperature, thermodynamic_temperature::kelvin),
    unit!(TemperatureDifference, "K", ["kelvin"], TemperatureInterval, temperature_interval::kelvin),
    unit!(TemperatureDifference, "degC", ["C"], TemperatureInterval, temperature_interval::degree_celsius),
    unit!(TemperatureDifference, "degF", ["F"], TemperatureInterval, temperature_interval::degree_fahrenheit),
    unit!(Pressure, "MPa", [], Pressure, pressure::megapascal),
    unit!(Pressure, "bar", ["bars"], Pressure, pressure::bar),
    unit!(Pressure, "kPa", [], Pressure, pressure::kilopascal),
    unit!(Pressure, "Pa", [], Pressure, pressure::pascal),
    unit!(Pressure, "psi", ["lbf/in2", "lb/in2"], Pressure, pressure::pound_force_per_square_inch),
    unit!(Pressure, "kg/cm2", ["kgf/cm2", "ksc"], Pressure, pressure::kilogram_force_per_square_centimeter),
    unit!(Pressure, "mbar", [], Pressure, pressure::millibar),
    unit!(Pressure, "hPa", [], Pressure, pressure::hectopascal),
    unit!(Share, "%", ["percent", "per cent", "pct"], 0.01),
    unit!(SharePerYear, "%/year", ["%/a", "%/yr", "% per year", "% a year", "%/annum", "% per annum"], 0.01 / YEAR),
    unit!(PerUnit, "pu", ["p.u.", "per unit"], 1.0),
    unit!(Impedance, "ohm", ["ohms"], ElectricalResistance, electrical_resistance::ohm),
    unit!(Impedance, "mohm", ["milliohm", "milliohms"], ElectricalResistance, electrical_resistance::milliohm),
    unit!(Impedance, "uohm", ["microohm", "microohms"], ElectricalResistance, electrical_resistance::microohm),
    unit!(ImpedancePerLength, "ohm/km", [], 1e-3),
    unit!(ImpedancePerLength, "ohm/mi", ["ohm/mile"], 1.0 / MILE),
    unit!(Capacitance, "nF", [], Capacitance, capacitance::nanofarad),
    unit!(Capacitance, "uF", [], Capacitance, capacitance::microfarad),
    unit!(Capacitance, "pF", [], Capacitance, capacitance::picofarad),
    unit!(CapacitancePerLength, "nF/km", [], 1e-12),
    unit!(CapacitancePerLength, "uF/km", [], 1e-9),
    unit!(CapacitancePerLength, "nF/mi", ["nF/mile"], 1e-9 / MILE),
    unit!(CapacitancePerLength, "uF/mi", ["uF/mile"], 1e-6 / MILE),
    unit!(Inductance, "mH", [], Inductance, inductance::millihenry),
    unit!(Inductance, "uH", [], Inductance, inductance::microhenry),
    unit!(Inductance, "H", [], Inductance, inductance::henry),
    unit!(Angle, "deg", ["degree", "degrees"], Angle, angle::degree),
    unit!(Angle, "rad", [], Angle, angle::radian),
    unit!(Mass, "kg", [], Mass, mass::kilogram),
    unit!(Mass, "lb", ["lbs", "pound", "pounds"], Mass, mass::pound),
    unit!(Mass, "g", [], Mass, mass::gram),
    unit!(Mass, "t", ["tonne", "tonnes"], Mass, mass::ton),
    unit!(Volume, "m3", [], Volume, volume::cubic_meter),
    unit!(Volume, "l", ["L", "litre", "litres", "liter", "liters"], Volume, volume::liter),
    unit!(Volume, "ft3", [], Volume, volume::cubic_foot),
    unit!(Force, "N", [], Force, force::newton),
    unit!(Force, "kN", [], Force, force::kilonewton),
    unit!(Force, "lbf", ["lb"], Force, force::pound_force),
    unit!(Acceleration, "g", [], Acceleration, acceleration::standard_gravity),
    unit!(Acceleration, "m/s2", [], Acceleration, acceleration::meter_per_second_squared),
    unit!(Irradiance, "W/m2", [], 1.0),
    unit!(VoltageRate, "kV/us", [], 1e9),
    unit!(VoltageRate, "V/us", [], 1e6),
    unit!(LengthPerVoltage, "mm/kV", [], 1e-6),
    unit!(LengthPerVoltage, "in/kV", [], 0.0254e-3),
    unit!(ChoppingNumber, "A/F^0.5", ["AF^-0.5", "A/sqrtF"], 1.0),
    unit!(CountPerDay, "per day", ["/day", "a day", "1/day"], 1.0 / 86_400.0),
];

/// Spellings, normalised, in the order of the table.
static SPELLINGS: LazyLock<Vec<(&'static str, String, &'static Unit)>> = LazyLock::new(|| {
    UNITS.iter().flat_map(|unit| unit.spellings.iter().map(move |s| (*s, s.to_ascii_lowercase(), unit))).collect()
});

/// The units of a dimension, the usual one first.
pub fn units_of(dimension: Dimension) -> impl Iterator<Item = &'static Unit> {
    UNITS.iter().filter(move |unit| unit.dimension == dimension)
}

/// The unit in which a dimension is shown where no author chose one.
#[allow(clippy::missing_panics_doc)]
pub fn canonical(dimension: Dimension) -> &'static Unit {
    static PLAIN: Unit = Unit { name: "", dimension: Dimension::PerUnit, spellings: &[], scale: Some((|n| n, |n| n)) };
    if dimension == Dimension::PerUnit { &PLAIN } else { units_of(dimension).next().unwrap_or(&PLAIN) }
}

/// Letters that look alike and blanks that are not blanks, in the one form of the table: degree sign, both micro and both ohm
/// signs, raised digits, the minus sign, narrow and no-break blanks.
pub fn normalised(text: &str) -> Cow<'_, str> {
    if text.is_ascii() {
        return Cow::Borrowed(text);
    }
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '°' | 'º' => out.push_str("deg"),
            'µ' | 'μ' => out.push('u'),
            'Ω' | '\u{2126}' => out.push_str("ohm"),
            '²' => out.push('2'),
            '³' => out.push('3'),
            '·' | '⋅' => {}
            '−' | '–' | '‐' | '‑' | '—' => out.push('-'),
            '\u{a0}' | '\u{202f}' | '\u{2009}' | '\u{2007}' | '\u{200a}' => out.push(' '),
            '℃' => out.push_str("degC"),
            '℉' => out.push_str("degF"),
            '″' | '”' | '“' => out.push('"'),
            other => out.push(other),
        }
    }
    Cow::Owned(out)
}

/// The unit that `text` spells, preferring those of `expected`.
///
/// The exact spelling is tried first; then one that differs in capitals only, if no two units of the expected dimensions
/// differ by just that (`mA` is never taken for `MA`).
pub fn look_up(text: &str, expected: &[Dimension]) -> Option<SpeltUnit> {
    let text = normalised(text.trim());
    let text = text.as_ref();
    if let Some(unit) = exact(text, expected) {
        return Some(SpeltUnit { unit, qualifier: None });
    }
    // A spelling that carries the kind of its value at the end: kVp, kAp, psig, psia, barg, bara, bar(g), Vdc.
    for (end, qualifier) in [
        ("(g)", Qualifier::Gauge),
        ("(a)", Qualifier::Absolute),
        ("(abs)", Qualifier::Absolute),
        ("g", Qualifier::Gauge),
        ("a", Qualifier::Absolute),
        ("pk", Qualifier::Peak),
        ("p", Qualifier::Peak),
        ("dc", Qualifier::Dc),
        ("ac", Qualifier::Ac),
        ("DC", Qualifier::Dc),
        ("AC", Qualifier::Ac),
    ] {
        let Some(stem) = text.strip_suffix(end) else { continue };
        let Some(unit) = exact(stem, expected) else { continue };
        let fits = match qualifier {
            Qualifier::Gauge | Qualifier::Absolute => unit.dimension == Dimension::Pressure,
            Qualifier::Dc | Qualifier::Ac => unit.dimension == Dimension::Voltage,
            _ => matches!(unit.dimension, Dimension::Voltage | Dimension::Current),
        };
        if fits {
            return Some(SpeltUnit { unit, qualifier: Some(qualifier) });
        }
    }
    let lower = text.to_ascii_lowercase();
    let mut alike = SPELLINGS
        .iter()
        .filter(|(_, spelling, unit)| *spelling == lower && (expected.is_empty() || expected.contains(&unit.dimension)))
        .map(|(_, _, unit)| *unit);
    let first = alike.next()?;
    alike.all(|other| other == first).then_some(SpeltUnit { unit: first, qualifier: None })
}

fn exact(text: &str, expected: &[Dimension]) -> Option<&'static Unit> {
    let mut any = None;
    for (spelling, _, unit) in SPELLINGS.iter() {
        if *spelling == text {
            if expected.contains(&unit.dimension) {
                return Some(unit);
            }
            any = any.or(Some(*unit));
        }
    }
    any
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::quantity::Measure;

    fn si(number: f64, unit: &str, dimension: Dimension) -> f64 {
        Measure::new(number, 0, look_up(unit, &[dimension]).expect(unit).unit).si.expect("a scale")
    }

    fn close(a: f64, b: f64) -> bool {
        (a - b).abs() <= 1e-9 * b.abs().max(1.0)
    }

    /// Conversion factors of NIST SP 811 (2008), appendix B.8 and B.9 (from memory).
    #[test]
    fn factors_of_nist_sp_811() {
        // SP 811 prints seven digits of the pound and what is made of it.
        assert!((si(1.0, "psi", Dimension::Pressure) - 6894.757).abs() < 0.001);
        assert!(close(si(1.0, "kg/cm2", Dimension::Pressure), 98_066.5));
        assert!((si(1.0, "lbf", Dimension::Force) - 4.448_222).abs() < 1e-6);
        assert!(close(si(1.0, "ft", Dimension::Length), 0.3048));
        assert!(close(si(1.0, "mph", Dimension::Speed), 0.44704));
        assert!(close(si(-40.0, "degF", Dimension::Temperature), 233.15));
        assert!(close(si(-40.0, "degC", Dimension::Temperature), 233.15));
        assert!((si(1.0, "lb", Dimension::Mass) - 0.453_592_4).abs() < 1e-7);
        assert!(close(si(1.0, "t", Dimension::Mass), 1000.0));
    }

    #[test]
    fn letters_that_look_alike() {
        for spelling in ["°C", "ºC", "℃", "deg.C", "degc"] {
            assert_eq!(look_up(spelling, &[Dimension::Temperature]).expect(spelling).unit.name, "degC", "{spelling}");
        }
        for spelling in ["µs", "μs", "us"] {
            assert_eq!(look_up(spelling, &[Dimension::Time]).expect(spelling).unit.name, "us");
        }
        for spelling in ["Ω", "\u{2126}", "ohm", "Ohm"] {
            assert_eq!(look_up(spelling, &[Dimension::Impedance]).expect(spelling).unit.name, "ohm");
        }
        assert_eq!(look_up("kg/cm²", &[Dimension::Pressure]).expect("raised").unit.name, "kg/cm2");
        assert_eq!(look_up("kV/µs", &[Dimension::VoltageRate]).expect("rate").unit.name, "kV/us");
    }

    #[test]
    fn spellings_that_say_the_kind() {
        let kvp = look_up("kVp", &[Dimension::Voltage]).expect("kVp");
        assert_eq!((kvp.unit.name, kvp.qualifier), ("kV", Some(Qualifier::Peak)));
        let psig = look_up("psig", &[Dimension::Pressure]).expect("psig");
        assert_eq!((psig.unit.name, psig.qualifier), ("psi", Some(Qualifier::Gauge)));
        let bara = look_up("bar(a)", &[Dimension::Pressure]).expect("bar(a)");
        assert_eq!((bara.unit.name, bara.qualifier), ("bar", Some(Qualifier::Absolute)));
        let vdc = look_up("Vdc", &[Dimension::Voltage]).expect("Vdc");
        assert_eq!((vdc.unit.name, vdc.qualifier), ("V", Some(Qualifier::Dc)));
    }

    #[test]
    fn capitals_matter_only_where_two_units_differ_by_them() {
        assert_eq!(look_up("KV", &[Dimension::Voltage]).expect("KV").unit.name, "kV");
        assert_eq!(look_up("mva", &[Dimension::ApparentPower]).expect("mva").unit.name, "MVA");
        assert_eq!(look_up("mv", &[Dimension::Voltage]), None, "mV or MV");
    }

    #[test]
    fn a_name_means_one_unit_of_its_dimension() {
        for (i, (spelling, _, unit)) in SPELLINGS.iter().enumerate() {
            for (other, _, twin) in SPELLINGS.iter().skip(i + 1) {
                assert!(
                    spelling != other || unit.dimension != twin.dimension,
                    "{spelling} twice in {:?}",
                    unit.dimension
                );
            }
        }
    }
}
