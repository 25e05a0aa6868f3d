//! The air of a site.

use crate::quantity::{Length, Physical, Pressure};

/// Pressure of the International Standard Atmosphere: p = p0 (1 - 0.0065 H / 288.15)^5.2559, up to 11 km (ISO 2533, from memory).
pub fn pressure(altitude: Length) -> Pressure {
    const SEA_LEVEL: f64 = 101_325.0;
    const LAPSE_OVER_TEMPERATURE: f64 = 0.0065 / 288.15;
    const EXPONENT: f64 = 5.2559;
    Pressure::from_si(SEA_LEVEL * (1.0 - LAPSE_OVER_TEMPERATURE * altitude.si()).powf(EXPONENT))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// 89.9, 79.5 and 70.1 kPa at 1000, 2000 and 3000 m (ISA, as the gas basis prints it).
    #[test]
    fn the_standard_atmosphere() {
        for (metres, kilopascals) in [(0.0, 101.325), (1000.0, 89.9), (2000.0, 79.5), (3000.0, 70.1)] {
            assert!((pressure(Length::from_si(metres)).si() / 1e3 - kilopascals).abs() < 0.05, "{metres}");
        }
    }
}
