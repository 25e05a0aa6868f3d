//! Pure functions on typed quantities, each citing its equation. No tables of ratings, no text, no findings.

pub mod atmosphere;
pub mod dc_component;
pub mod first_pole;
pub mod gas;
pub mod infeed;
pub mod insulation_site;
pub mod itrv;
pub mod network_trv;
pub mod short_circuit;
pub mod short_line_fault;
pub mod switching;
pub mod trv;
