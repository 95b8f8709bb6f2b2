//! The fire physics: pure functions, one file per phenomenon, no state.

pub mod combustion;
pub mod extinction;
pub mod plume;
pub mod smooth;
