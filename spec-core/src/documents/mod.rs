//! What people and machines read: models in, text out.

pub mod align;
pub mod json;
pub mod reference;
