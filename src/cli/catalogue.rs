//! `doorglow catalogue`.

use super::arguments::{CatalogueOptions, Format};
use super::failure::{Done, Failure};
use super::streams;
use crate::catalogue;

/// Lists the catalogue.
///
/// # Errors
/// When standard output cannot be written.
pub fn catalogue(options: &CatalogueOptions) -> Result<Done, Failure> {
    let format = match options.format {
        Format::Text => catalogue::Format::Text,
        Format::Json => catalogue::Format::Json,
    };
    streams::write(&catalogue::listing(format))?;
    Ok(Done::Fine)
}
