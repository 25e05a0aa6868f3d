//! States of the insulating gas in a closed volume: density, pressure, dew point, what is left as vapour in the cold.
//!
//! A pure gas is a truncated virial equation of state with a published vapour-pressure equation, and a sublimation line below
//! the triple point. A mixture has its density by a virial equation with the excess of the Peng-Robinson equation, and its dew
//! point by the latter with a stability test. Constants are data with their source.

mod constants;
mod cubic;
mod mixture;
mod pure;
mod warming;

pub use constants::{Gas, PureGas, gas, pure};
pub use mixture::{GasMixture, MixtureState};
pub use pure::{Condensation, GasFault, Phase, TwoPhase};
pub use warming::{WarmingBasis, warming_potential};

/// Sulphur hexafluoride.
///
/// # Panics
///
/// Never: the gas is in the table, and a test says so.
#[allow(clippy::expect_used, reason = "the table is part of the program")]
pub fn sf6() -> &'static PureGas {
    pure("SF6").expect("SF6 is in the table of gases")
}
