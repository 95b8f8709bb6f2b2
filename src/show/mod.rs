//! Results as text, tables and plots: bytes first, files last.

mod run_json;
pub mod text;
mod timeline_csv;

pub use run_json::{RUN_SCHEMA_VERSION, RunReading};
pub use timeline_csv::timeline_csv;
