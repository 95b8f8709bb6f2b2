//! doorglow: a compartment-fire zone model for people who read room fires.
//!
//! Data flows one way: scenario -> plan -> solve -> record -> reading,
//! exposure -> show. See `DEVELOPERS.md` for the house and its rules and
//! `docs/method.md` for every equation.
//!
//! For planning and teaching only, never for decisions at a live incident.

// Test plans shared with `tests/` name the library as its users do.
#[cfg(test)]
extern crate self as doorglow;

pub mod catalogue;
pub mod cli;
pub mod exposure;
pub mod physics;
pub mod plan;
pub mod reading;
pub mod record;
pub mod scenario;
pub mod show;
pub mod solve;
pub mod units;
