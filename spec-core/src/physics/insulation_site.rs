//! Insulation and continuous current at the site: altitude, pollution, ambient temperature (IEC 62271-1, IEC 60071-2, IEC 60815-1,
//! IEEE C37.010).

use crate::quantity::{
    ElectricCurrent, ElectricPotential, Length, LengthPerVoltage, Physical, TemperatureInterval,
    ThermodynamicTemperature,
};

/// Altitude up to which insulation levels hold without correction, m. IEC 62271-1:2011 2.1.
const REFERENCE_ALTITUDE: f64 = 1000.0;

/// Height over which the withstand of air falls to 1/e, m. IEC 62271-1:2011 2.3.2, IEC 60071-2.
const SCALE_HEIGHT: f64 = 8150.0;

/// Ka = exp(m (H - 1000 m) / 8150 m), 1 up to 1000 m; m by the kind of voltage. IEC 62271-1:2011 2.3.2.
///
/// It counts for external insulation only: neither gas nor oil feels the altitude.
pub fn altitude_factor(altitude: Length, exponent: f64) -> f64 {
    (exponent * (altitude.si() - REFERENCE_ALTITUDE).max(0.0) / SCALE_HEIGHT).exp()
}

/// Ka = exp(m H / 8150 m) from sea level, for insulation that was co-ordinated there. IEC 60071-2.
pub fn altitude_factor_from_sea_level(altitude: Length, exponent: f64) -> f64 {
    (exponent * altitude.si() / SCALE_HEIGHT).exp()
}

/// What a level rated for up to 1000 m is worth on site: level / Ka. V.
pub fn worth_on_site(level: ElectricPotential, factor: f64) -> ElectricPotential {
    level / factor
}

/// The level, rated for up to 1000 m, that gives `required` on site: required Ka. V.
pub fn needed_level(required: ElectricPotential, factor: f64) -> ElectricPotential {
    required * factor
}

/// Creepage: USCD Ur / sqrt3. m; USCD over the phase-to-earth voltage. IEC 60815-1.
pub fn creepage(unified: LengthPerVoltage, voltage: ElectricPotential) -> Length {
    unified * voltage / 3f64.sqrt()
}

/// The USCD of a creepage: sqrt3 l / Ur. m/V.
pub fn unified_of_creepage(creepage: Length, voltage: ElectricPotential) -> LengthPerVoltage {
    creepage * 3f64.sqrt() / voltage
}

/// A creepage over the phase-to-phase voltage, as IEC 815:1986 had it, as one over the phase-to-earth voltage: times sqrt3.
pub fn unified_of_between_phases(between_phases: LengthPerVoltage) -> LengthPerVoltage {
    between_phases * 3f64.sqrt()
}

/// Exponent of the current in the rise of temperature: rise goes with I^1.8. IEEE C37.010-1999 4.4.3, from memory.
const RISE_EXPONENT: f64 = 1.8;

/// Current allowed at an ambient temperature: Ia = Ir ((greatest - ambient) / rise)^(1/1.8). A; zero where the ambient is at the
/// greatest temperature or above. IEEE C37.010-1999 4.4.3, from memory.
pub fn allowed_current(
    rated: ElectricCurrent,
    ambient: ThermodynamicTemperature,
    greatest: ThermodynamicTemperature,
    rise: TemperatureInterval,
) -> ElectricCurrent {
    let share = (greatest.si() - ambient.si()) / rise.si();
    rated * share.max(0.0).powf(1.0 / RISE_EXPONENT)
}

/// The rated current that allows `load` at an ambient temperature; none where no rating does. A. [`allowed_current`] the other way.
pub fn needed_current(
    load: ElectricCurrent,
    ambient: ThermodynamicTemperature,
    greatest: ThermodynamicTemperature,
    rise: TemperatureInterval,
) -> Option<ElectricCurrent> {
    let share = allowed_current(ElectricCurrent::from_si(1.0), ambient, greatest, rise).si();
    (share > 0.0).then(|| load / share)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn m(n: f64) -> Length {
        Length::from_si(n)
    }

    fn celsius(n: f64) -> ThermodynamicTemperature {
        ThermodynamicTemperature::from_si(n + 273.15)
    }

    /// 1.13 at 2000 m is printed in a public article that quotes IEC 62271-1:2011.
    #[test]
    fn altitude() {
        assert!((altitude_factor(m(2000.0), 1.0) - 1.13).abs() < 0.005);
        assert_eq!(altitude_factor(m(300.0), 1.0), 1.0);
        let level = ElectricPotential::from_si(650e3);
        let factor = altitude_factor(m(2500.0), 1.0);
        assert!((needed_level(worth_on_site(level, factor), factor).si() - level.si()).abs() < 1e-6);
    }

    /// Own calculation: 34.7 mm/kV at 145 kV are 2905 mm; 20 mm/kV between phases are 34.6 to earth.
    #[test]
    fn creepage_and_back() {
        let (unified, voltage) = (LengthPerVoltage::from_si(34.7e-6), ElectricPotential::from_si(145e3));
        let length = creepage(unified, voltage);
        assert!((length.si() - 2.905).abs() < 5e-4);
        assert!((unified_of_creepage(length, voltage).si() - unified.si()).abs() < 1e-15);
        assert!((unified_of_between_phases(LengthPerVoltage::from_si(20e-6)).si() * 1e6 - 34.64).abs() < 0.005);
    }

    /// Own calculation: silver contacts at 50 degC carry 91.1 % of their current, at 105 degC nothing.
    #[test]
    fn ambient() {
        let (rated, rise) = (ElectricCurrent::from_si(2000.0), TemperatureInterval::from_si(65.0));
        let allowed = allowed_current(rated, celsius(50.0), celsius(105.0), rise);
        assert!((allowed.si() / 2000.0 - 0.911).abs() < 5e-4);
        let needed = needed_current(allowed, celsius(50.0), celsius(105.0), rise).expect("a rating");
        assert!((needed.si() - 2000.0).abs() < 1e-9);
        assert_eq!(needed_current(rated, celsius(105.0), celsius(105.0), rise), None);
    }
}
