//! States of the insulating gas in a closed volume: density, pressure, dew point, what is left as vapour in the cold.
//!
//! A pure gas is a truncated virial equation of state with a published vapour-pressure equation, and a sublimation line below
//! the triple point. Constants are data with their source.

mod constants;
mod pure;

pub use constants::{PureGas, sf6};
pub use pure::{Condensation, GasFault, Phase, TwoPhase};
