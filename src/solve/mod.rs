//! The solver: state layout, derivative, pressure balance, events,
//! integration, ledger. Knows the plan and the physics, fills the record,
//! knows no files.

#[cfg(test)]
mod allocation_test;
mod building;
mod burning;
mod changes;
mod derivative;
mod driver;
mod flags;
mod groups;
mod heat;
pub mod integrator;
mod layers;
mod layout;
mod linear;
mod observe;
mod passage;
mod pressure;
mod run;
mod schedule;
mod stretches;
mod triggers;

pub use building::{LAYER_GUARD, PlanFault, START_LAYER, WALL_STRIPS};
pub use run::run;
