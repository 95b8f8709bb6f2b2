//! Results as text, tables and plots: bytes first, files last.

pub mod files;
pub mod plots;
pub mod quantity;
mod record_csv;
mod record_json;
mod run_json;
pub mod text;
mod timeline_csv;
mod words;

pub use record_csv::record_csv;
pub use record_json::{SCHEMA_VERSION, record_json};
pub use run_json::{RUN_SCHEMA_VERSION, RunReading};
pub use timeline_csv::timeline_csv;

/// The one-line caution that goes with every output.
pub const CAUTION: &str = "For planning and teaching only. Not for decisions at a live incident.";

/// Version of the program, as written into every output.
pub const PROGRAM_VERSION: &str = env!("CARGO_PKG_VERSION");
