//! Results as text, tables and plots: bytes first, files last.

pub mod files;
pub mod plots;
pub mod quantity;
mod record_csv;
mod record_json;
mod words;

pub use record_csv::record_csv;
pub use record_json::{SCHEMA_VERSION, record_json};

/// The one-line caution that goes with every output.
pub const CAUTION: &str = "For planning and teaching only. Not for decisions at a live incident.";

/// Version of the program, as written into every output.
pub const PROGRAM_VERSION: &str = env!("CARGO_PKG_VERSION");
