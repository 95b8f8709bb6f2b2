//! The fire physics: pure functions, one file per phenomenon, no state.

pub mod airtightness;
pub mod cold_front;
pub mod combustion;
pub mod conduction;
pub mod emissivity;
pub mod enclosure;
pub mod exchange;
pub mod external_flame;
pub mod extinction;
pub mod fan;
pub mod gas;
pub mod glass;
pub mod growth;
pub mod hand;
pub mod humidity;
pub mod item;
pub mod leakage;
pub mod mixing;
pub mod opening_flow;
pub mod plume;
pub mod smooth;
pub mod view_factor;
pub mod visibility;
pub mod wind;
