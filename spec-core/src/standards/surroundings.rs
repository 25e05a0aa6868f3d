//! Surroundings: altitude, pollution, temperature (IEC 62271-1, IEC 60815-1, IEEE C37.010).

use std::sync::LazyLock;

use serde::Deserialize;

use super::{same, table};
use crate::quantity::{Length, LengthPerVoltage, Physical, TemperatureInterval, ThermodynamicTemperature};

/// A withstand voltage, for the altitude.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
pub enum WithstandVoltage {
    /// Ud.
    #[serde(rename = "power frequency")]
    PowerFrequency,
    /// Up.
    #[serde(rename = "lightning impulse")]
    LightningImpulse,
    /// Us between phases.
    #[serde(rename = "switching impulse between phases")]
    SwitchingBetweenPhases,
    /// Us across the open breaker.
    #[serde(rename = "switching impulse longitudinal")]
    SwitchingLongitudinal,
    /// Us to earth.
    #[serde(rename = "switching impulse to earth")]
    SwitchingToEarth,
}

#[derive(Clone, Debug, Deserialize)]
struct ExponentRow {
    voltage: WithstandVoltage,
    exponent: f64,
}

/// A class of site pollution severity.
#[derive(Clone, Debug, Deserialize)]
pub struct PollutionClass {
    /// Its letter, a to e.
    pub class: String,
    /// Its word.
    pub name: String,
    uscd_mm_per_kv: f64,
    scd_mm_per_kv: f64,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

impl PollutionClass {
    /// Reference creepage over the phase-to-earth voltage, USCD.
    pub fn unified(&self) -> LengthPerVoltage {
        LengthPerVoltage::from_si(self.uscd_mm_per_kv * 1e-6)
    }

    /// Creepage over the phase-to-phase voltage, as IEC 815:1986 had it.
    pub fn between_phases(&self) -> LengthPerVoltage {
        LengthPerVoltage::from_si(self.scd_mm_per_kv * 1e-6)
    }
}

/// The part of a breaker that limits its continuous current.
#[derive(Clone, Debug, Deserialize)]
pub struct TemperatureLimit {
    /// What the part is.
    pub part: String,
    greatest_c: f64,
    rise_k: f64,
    /// How sure the row is.
    pub status: String,
    /// Where the row is from.
    pub source: String,
}

impl TemperatureLimit {
    /// The greatest temperature.
    pub fn greatest(&self) -> ThermodynamicTemperature {
        ThermodynamicTemperature::from_si(self.greatest_c + CELSIUS)
    }

    /// The greatest rise at rated current.
    pub fn rise(&self) -> TemperatureInterval {
        TemperatureInterval::from_si(self.rise_k)
    }
}

#[derive(Clone, Debug, Deserialize)]
struct IceRow {
    mm: f64,
}

/// 0 degC in kelvin.
const CELSIUS: f64 = 273.15;

static EXPONENTS: LazyLock<Vec<ExponentRow>> =
    LazyLock::new(|| table::rows(include_str!("../../data/altitude_exponents.csv")));
static POLLUTION: LazyLock<Vec<PollutionClass>> =
    LazyLock::new(|| table::rows(include_str!("../../data/pollution.csv")));
static LIMITS: LazyLock<Vec<TemperatureLimit>> =
    LazyLock::new(|| table::rows(include_str!("../../data/temperature_limits.csv")));
static ICE: LazyLock<Vec<IceRow>> = LazyLock::new(|| table::rows(include_str!("../../data/ice_classes.csv")));

/// The exponent m of the altitude factor. IEC 62271-1:2011 2.3.2.
pub fn altitude_exponent(voltage: WithstandVoltage) -> Option<f64> {
    EXPONENTS.iter().find(|row| row.voltage == voltage).map(|row| row.exponent)
}

/// The classes of pollution, lightest first. IEC 60815-1.
pub fn pollution_classes() -> &'static [PollutionClass] {
    &POLLUTION
}

/// A class of pollution by its letter, in either case.
pub fn pollution_class(letter: &str) -> Option<&'static PollutionClass> {
    POLLUTION.iter().find(|row| row.class.eq_ignore_ascii_case(letter.trim()))
}

/// The classes of ice coating, thinnest first. IEC 62271-1 4.1.
pub fn ice_classes() -> impl Iterator<Item = Length> {
    ICE.iter().map(|row| Length::from_si(row.mm * 1e-3))
}

/// The limits of temperature.
pub fn temperature_limits() -> &'static [TemperatureLimit] {
    &LIMITS
}

/// The limit with this greatest temperature and rise, if the table has it.
pub fn temperature_limit(
    greatest: ThermodynamicTemperature,
    rise: TemperatureInterval,
) -> Option<&'static TemperatureLimit> {
    LIMITS.iter().find(|row| same(row.greatest().si(), greatest.si()) && same(row.rise_k, rise.si()))
}

#[cfg(test)]
pub(super) fn lengths() -> [(&'static str, &'static str, usize); 4] {
    [
        ("altitude exponents", include_str!("../../data/altitude_exponents.csv"), EXPONENTS.len()),
        ("pollution", include_str!("../../data/pollution.csv"), POLLUTION.len()),
        ("ice classes", include_str!("../../data/ice_classes.csv"), ICE.len()),
        ("temperature limits", include_str!("../../data/temperature_limits.csv"), LIMITS.len()),
    ]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn classes_by_letter() {
        assert_eq!(pollution_class("E").expect("a class").name, "very heavy");
        assert!(pollution_class("f").is_none());
        assert!(pollution_classes().windows(2).all(|pair| pair[0].unified() < pair[1].unified()));
    }

    #[test]
    fn every_voltage_has_an_exponent() {
        use WithstandVoltage::{
            LightningImpulse, PowerFrequency, SwitchingBetweenPhases, SwitchingLongitudinal, SwitchingToEarth,
        };
        for voltage in
            [PowerFrequency, LightningImpulse, SwitchingBetweenPhases, SwitchingLongitudinal, SwitchingToEarth]
        {
            assert!(altitude_exponent(voltage).is_some(), "{voltage:?}");
        }
        assert_eq!(temperature_limits().len(), 3);
    }
}
