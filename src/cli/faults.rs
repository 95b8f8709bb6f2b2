//! Faults of a scenario: in words on standard error, as data on standard
//! output when JSON is asked for.

use super::arguments::Format;
use super::failure::Failure;
use super::streams;
use crate::scenario::{Fault, Report, Severity};
use crate::show::PROGRAM_VERSION;
use serde_json::{Value, json};

/// Tells all faults and gives the failure that they are.
pub fn tell(report: &Report, format: Format) -> Failure {
    caution(report);
    if format == Format::Json {
        let document = json!({
            "program": "doorglow",
            "program_version": PROGRAM_VERSION,
            "usable": false,
            "faults": as_json(report),
        });
        if let Err(failure) = streams::write(&format!("{document:#}\n")) {
            return failure;
        }
    }
    Failure::Scenario
}

/// Says what looks odd, if anything does.
pub fn caution(report: &Report) {
    if !report.faults.is_empty() {
        streams::say(&report.render(streams::is_side_coloured(), streams::side_width()));
    }
}

/// The faults as data, with line and column counted from one.
pub fn as_json(report: &Report) -> Vec<Value> {
    report
        .faults
        .iter()
        .map(|fault| fault_json(fault, report))
        .collect()
}

fn fault_json(fault: &Fault, report: &Report) -> Value {
    let place = fault
        .span
        .as_ref()
        .map(|span| place(report.text(), span.start));
    json!({
        "file": report.file_name(),
        "code": fault.code,
        "severity": match fault.severity {
            Severity::Error => "error",
            Severity::Warning => "caution",
        },
        "message": fault.message,
        "line": place.map(|place| place.0),
        "column": place.map(|place| place.1),
        "label": fault.label,
        "help": fault.help,
    })
}

/// Line and column in characters of a byte of the text, from one.
fn place(text: &str, byte: usize) -> (usize, usize) {
    let before = text.get(..byte).unwrap_or(text);
    let line = before.matches('\n').count() + 1;
    let start = before.rfind('\n').map_or(0, |newline| newline + 1);
    (line, before[start..].chars().count() + 1)
}

#[cfg(test)]
mod tests {
    use super::place;

    #[test]
    fn cli_places_count_from_one_in_characters() {
        assert_eq!(place("a\n°b", 0), (1, 1));
        assert_eq!(place("a\n°b", 4), (2, 2));
        assert_eq!(place("a", 99), (1, 2));
    }
}
