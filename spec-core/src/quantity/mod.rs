//! Quantities: units as types, reading and writing them.
//!
//! Formulas are written with the types of the `uom` library, so that a voltage cannot be added to a current. What an author
//! wrote is a [`Measure`]: the number, its unit, and the value in SI base units.

mod dimension;
mod display;
mod measure;
mod unit;

pub use dimension::Dimension;
pub use display::{rounded, significant};
pub use measure::{Measure, Physical};
pub use unit::{Qualifier, SpeltUnit, Unit, canonical, look_up, normalised, units_of};

pub use uom::si::f64::{
    Acceleration, Angle, Capacitance, ElectricCurrent, ElectricPotential, ElectricalResistance, Force, Frequency,
    Inductance, Length, Mass, MassDensity, Power, Pressure, Ratio, TemperatureInterval, ThermodynamicTemperature, Time,
    Velocity, Volume,
};

use uom::si::{ISQ, Quantity, SI};
use uom::typenum::{N1, N2, N3, N4, P1, P2, P3, P4, Z0};

/// Steepness of a recovery voltage, V/s: the type of a voltage over a time.
pub type VoltageRate = Quantity<ISQ<P2, P1, N4, N1, Z0, Z0, Z0>, SI<f64>, f64>;

/// Square of a current times a time, A2 s: heat in one ohm.
pub type JouleIntegral = Quantity<ISQ<Z0, Z0, P1, P2, Z0, Z0, Z0>, SI<f64>, f64>;

/// An impedance a length, ohm/m.
pub type ImpedancePerLength = Quantity<ISQ<P1, P1, N3, N2, Z0, Z0, Z0>, SI<f64>, f64>;

/// A capacitance a length, F/m.
pub type CapacitancePerLength = Quantity<ISQ<N3, N1, P4, P2, Z0, Z0, Z0>, SI<f64>, f64>;

/// A length over a voltage, m/V: specific creepage.
pub type LengthPerVoltage = Quantity<ISQ<N1, N1, P3, P1, Z0, Z0, Z0>, SI<f64>, f64>;

/// A steepness over the current that it grows with, V/(s A): the line-side factor of a short-line fault.
pub type VoltageRatePerCurrent = Quantity<ISQ<P2, P1, N4, N2, Z0, Z0, Z0>, SI<f64>, f64>;

/// A chopping number: the chopped current over the square root of the capacitance beside the breaker, A/F^0.5. Its dimension is
/// a broken one, so that it is a type of its own and not a quantity of `uom`.
#[derive(Clone, Copy, Debug, PartialEq, PartialOrd)]
pub struct ChoppingNumber(f64);
