//! What people and machines read: models in, text out.

pub mod align;
pub mod curves;
pub mod json;
pub mod reference;
