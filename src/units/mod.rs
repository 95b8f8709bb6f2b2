//! Quantities as text with units: read once at the door, written once in show.
//!
//! [`read`] turns `"8 ft"` into 2.4384 (SI, plain `f64`); [`write()`] is its exact
//! inverse and picks a unit people read. One table of units per dimension
//! ([`table::UNITS`]) feeds reading, writing, the messages and the reference.

mod table;
mod text;

pub use table::{Dimension, UNITS, Unit};
pub use text::{QuantityError, read, rounded, write};
