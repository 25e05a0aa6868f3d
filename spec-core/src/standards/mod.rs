//! The tables of the standards: data with a source and a status in each row, never literals in a rule.
//!
//! Status: V read in a public source, F follows from a formula that can be derived, M from memory (MF: of a value that a rule
//! reproduces), D in doubt. No current edition of a breaker standard was at hand; the tables must be held against the standards
//! in force before use.

mod capacitive;
mod cited;
mod clearances;
mod cooling;
mod currents;
mod earthing;
mod endurance;
mod gas_law;
mod generator_breaker;
mod insulation;
mod line_side;
mod making;
mod mechanical;
mod pressure;
mod short_circuit;
mod supply;
mod surroundings;
mod table;
mod time_constants;
mod trv_duties;
mod voltages;

pub use capacitive::{
    BankAllowance, CapacitiveCircuit, CapacitiveRating, bank_allowance, capacitive_rating, capacitive_voltage_factor,
};
pub use cited::{Citation, OldWording, StandardScope, old_wordings, rating_structure, replacement_of};
pub use clearances::clearance;
pub use cooling::altitude_cooling;
pub use currents::{
    PreferredCurrents, RatingSeries, durations, is_duration, preferred_number, usual_continuous_current,
};
pub use earthing::{first_pole_factors, out_of_phase_factor};
pub use endurance::{class_for_operations, operations_of_class};
pub use gas_law::{CountsFrom, ForbiddenGases, GasLaw, gas_law, is_fluorinated};
pub use generator_breaker::{GeneratorBreakerTrv, GeneratorFault, generator_breaker_trv};
pub use insulation::{InsulationLevel, insulation_levels};
pub use line_side::{
    InitialTrvRow, LineSideRow, ShortLineDuty, ShortLineRow, initial_trv_row, line_side, short_line_faults_apply,
    short_line_row,
};
pub use making::{MakingCase, making_factor};
pub use mechanical::{TerminalLoads, seismic_level, seismic_level_for, terminal_loads, zinc_coating};
pub use pressure::{GAUGE_REFERENCE, GaugeReference, REFERENCE_TEMPERATURE};
pub(crate) use short_circuit::{AtTime, asynchronous_decay, synchronous_decay};
pub use short_circuit::{
    VoltageFactor, equivalent_frequency_share, generator_r_over_x, motor_r_over_x, voltage_factor,
};
pub use supply::{Device, Supply, coil_range, is_supply_voltage, supply_voltages};
pub use surroundings::{
    PollutionClass, TemperatureLimit, WithstandVoltage, altitude_exponent, pollution_class, pollution_classes,
    temperature_limit, temperature_limits,
};
pub use time_constants::{TimeConstantCase, TimeConstants};
pub use trv_duties::{Duty, DutyRow, SystemClass, VoltageRange, duty_row, s1_time};
pub use voltages::{
    is_rated_voltage, nominal_as_rated, rated_at_or_above, rated_voltages, steps_between_voltages, usual_rated,
};

use serde::Deserialize;

/// A family of standards.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum Regime {
    /// IEC.
    Iec,
    /// IEEE.
    Ieee,
}

/// Whether two values of a table are one: within a hundredth of a percent, since they are read from decimal text.
fn same(a: f64, b: f64) -> bool {
    (a - b).abs() <= 1e-4 * a.abs().max(b.abs())
}
