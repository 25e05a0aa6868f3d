//! What pressures are referred to.

use crate::quantity::{Physical, Pressure};

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

/// The temperature that rated levels are stated for, 20 degC in kelvin (IEC 62271-1, from memory).
pub const REFERENCE_TEMPERATURE: f64 = 293.15;
