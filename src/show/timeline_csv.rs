//! The timeline as a table for spreadsheets.

use super::text::values;
use crate::reading::{Moment, spoken};

/// Headings, with units.
const HEADINGS: [&str; 10] = [
    "time from ignition (s)",
    "time since action (s)",
    "action",
    "kind",
    "about",
    "what happens",
    "numbers",
    "earliest (s)",
    "latest (s)",
    "weight",
];

/// The timeline as CSV bytes, times in seconds with one decimal, numbers in
/// metric units.
///
/// # Errors
/// When a row cannot be written, which a buffer in memory does not do.
pub fn timeline_csv(moments: &[Moment]) -> Result<Vec<u8>, csv::Error> {
    let mut writer = csv::Writer::from_writer(Vec::new());
    writer.write_record(HEADINGS)?;
    for moment in moments {
        writer.write_record(row(moment))?;
    }
    writer
        .into_inner()
        .map_err(|error| csv::Error::from(error.into_error()))
}

fn row(moment: &Moment) -> [String; 10] {
    let seconds = |time: f64| format!("{time:.1}");
    let since = moment.since_action.as_ref();
    let band = moment.band;
    let numbers: Vec<String> = moment
        .numbers
        .iter()
        .map(|number| {
            let value = values::metric(number.value, number.dimension);
            format!("{} {value}", number.label)
        })
        .collect();
    [
        seconds(moment.time),
        since.map_or_else(String::new, |since| seconds(since.seconds)),
        since.map_or_else(String::new, |since| since.action.clone()),
        moment.kind.name().to_owned(),
        spoken(&moment.name),
        moment.text.clone(),
        numbers.join("; "),
        band.map_or_else(String::new, |band| seconds(band.earliest)),
        band.map_or_else(String::new, |band| seconds(band.latest)),
        format!("{:?}", moment.weight).to_lowercase(),
    ]
}
