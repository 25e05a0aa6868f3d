//! What pressures are referred to.

use crate::quantity::{Physical, Pressure, ThermodynamicTemperature};

/// The pressure that a gauge reading is referred to.
#[derive(Clone, Copy, Debug)]
pub struct GaugeReference(f64);

impl GaugeReference {
    /// The pressure.
    pub fn value(self) -> Pressure {
        Pressure::from_si(self.0)
    }
}

/// Rated levels are stated for the standard atmosphere, whatever the altitude: 101.3 kPa (IEC 62271-1, from memory).
pub const GAUGE_REFERENCE: GaugeReference = GaugeReference(101_300.0);

/// The temperature that rated levels are stated for.
#[derive(Clone, Copy, Debug)]
pub struct ReferenceTemperature(f64);

impl ReferenceTemperature {
    /// The temperature.
    pub fn value(self) -> ThermodynamicTemperature {
        ThermodynamicTemperature::from_si(self.0)
    }

    /// The same in kelvin, for the equations of state.
    pub const fn kelvin(self) -> f64 {
        self.0
    }
}

/// Rated levels are stated for 20 degC (IEC 62271-1, from memory).
pub const REFERENCE_TEMPERATURE: ReferenceTemperature = ReferenceTemperature(293.15);
