//! The fire physics: pure functions, one file per phenomenon, no state.

pub mod cold_front;
pub mod combustion;
pub mod conduction;
pub mod emissivity;
pub mod extinction;
pub mod growth;
pub mod hand;
pub mod humidity;
pub mod leakage;
pub mod plume;
pub mod smooth;
pub mod view_factor;
pub mod visibility;
