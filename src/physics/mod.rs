//! The fire physics: pure functions, one file per phenomenon, no state.

pub mod cold_front;
pub mod exchange;
pub mod external_flame;
pub mod fan;
pub mod glass;
pub mod mixing;
pub mod combustion;
pub mod conduction;
pub mod emissivity;
pub mod enclosure;
pub mod extinction;
pub mod gas;
pub mod growth;
pub mod hand;
pub mod humidity;
pub mod item;
pub mod leakage;
pub mod opening_flow;
pub mod plume;
pub mod smooth;
pub mod view_factor;
pub mod visibility;
