//! The record as a table for a spreadsheet.

use super::quantity::{table_number, unit};
use super::words::label;
use crate::plan::Plan;
use crate::record::{Column, Record};

/// The record as comma-separated values in UTF-8: time first, then every
/// history in the order of the record. Headings carry subject, quantity and
/// unit in whole words; a cell is empty where there is no value.
///
/// # Errors
/// When the table cannot be put together; the bytes go to memory only.
pub fn record_csv(record: &Record, plan: &Plan) -> Result<Vec<u8>, csv::Error> {
    let mut writer = csv::Writer::from_writer(Vec::new());
    writer.write_record(headings(record, plan))?;
    for (row, time) in record.time.iter().enumerate() {
        writer.write_field(table_number(*time))?;
        for column in &record.columns {
            let value = column.values.get(row).copied().unwrap_or(f64::NAN);
            let shown = unit(column.quantity.dimension()).shown(value);
            writer.write_field(table_number(shown))?;
        }
        writer.write_record(None::<&[u8]>)?;
    }
    writer
        .into_inner()
        .map_err(|error| csv::Error::from(error.into_error()))
}

fn headings(record: &Record, plan: &Plan) -> Vec<String> {
    let mut headings = vec!["time [s]".to_owned()];
    headings.extend(
        record
            .columns
            .iter()
            .map(|column| heading(record, plan, column)),
    );
    headings
}

fn heading(record: &Record, plan: &Plan, column: &Column) -> String {
    let unit = unit(column.quantity.dimension()).name;
    let unit = if unit.is_empty() { "-" } else { unit };
    format!(
        "{}: {} [{unit}]",
        record.name(column.subject),
        label(plan, column)
    )
}
