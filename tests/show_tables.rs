//! Tables and files of an invented record.

#![allow(clippy::unwrap_used)]

mod invented;

use doorglow::record::{Ended, Quantity, Subject};
use doorglow::show::{files, record_csv, record_json};
use std::fs;
use std::path::Path;

#[test]
fn regress_csv_headings() {
    let bytes = record_csv(&invented::record(), &invented::plan()).unwrap();
    let mut reader = csv::Reader::from_reader(bytes.as_slice());
    let headings: Vec<String> = reader
        .headers()
        .unwrap()
        .iter()
        .map(str::to_owned)
        .collect();
    insta::assert_snapshot!(headings.join("\n"));
    let rows: Vec<csv::StringRecord> = reader.records().map(Result::unwrap).collect();
    assert_eq!(rows.len(), 901);
    assert_eq!(&rows[0][0], "0");
    let column = |name: &str| headings.iter().position(|h| h == name).unwrap();
    let temperature = column("bedroom: upper layer temperature [°C]");
    let shown: f64 = rows[0][temperature].parse().unwrap();
    let kelvin = invented::record().get(Subject::Room(0), Quantity::UpperTemperature)[0];
    assert!((shown - (kelvin - 273.15)).abs() < 1e-5);
    // A shut front door has no neutral plane: the cell is empty.
    assert_eq!(&rows[0][column("front_door: neutral plane [m]")], "");
}

#[test]
fn verify_csv_of_a_ragged_record_has_empty_cells() {
    let mut record = invented::record();
    record.columns[0].values.truncate(1);
    let bytes = record_csv(&record, &invented::plan()).unwrap();
    let mut reader = csv::Reader::from_reader(bytes.as_slice());
    let rows: Vec<csv::StringRecord> = reader.records().map(Result::unwrap).collect();
    assert_eq!(&rows[1][1], "");
}

#[test]
fn verify_json_reads_back_as_the_record() {
    let mut record = invented::record();
    record.ended = Ended::Failed(123.0, "an invented reason".to_owned());
    let plan = invented::plan();
    let bytes = record_json(&record, &plan, "abc123").unwrap();
    assert_eq!(bytes, record_json(&record, &plan, "abc123").unwrap());
    let json: serde_json::Value = serde_json::from_slice(&bytes).unwrap();
    assert_eq!(json["schema_version"], 1);
    assert_eq!(json["program_version"], env!("CARGO_PKG_VERSION"));
    assert_eq!(json["scenario_hash"], "abc123");
    assert_eq!(json["tactic"], "hold_the_door");
    assert_eq!(json["ended"]["time"], 123.0);
    assert_eq!(json["time"]["values"].as_array().unwrap().len(), 901);
    assert_eq!(json["ledger"]["energy"]["unit"], "J");
    let columns = json["columns"].as_array().unwrap();
    assert_eq!(columns.len(), record.columns.len());
    for (shown, column) in columns.iter().zip(&record.columns) {
        assert_eq!(shown["of"], record.name(column.subject));
        // The reader of serde_json may miss the last bit of a number.
        match shown["values"][0].as_f64() {
            Some(first) => assert!((first - column.values[0]).abs() <= 1e-15 * first.abs()),
            None => assert!(column.values[0].is_nan()),
        }
    }
}

fn some_files() -> Vec<(String, Vec<u8>)> {
    let json = record_json(&invented::record(), &invented::plan(), "h").unwrap();
    vec![
        ("record.json".to_owned(), json),
        ("record.csv".to_owned(), b"first".to_vec()),
        (
            "opening_a.svg".to_owned(),
            format!("<svg>\n{}\n</svg>", files::PLOT_MARK).into_bytes(),
        ),
    ]
}

fn listing(dir: &Path) -> Vec<String> {
    let mut names: Vec<String> = fs::read_dir(dir)
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .collect();
    names.sort();
    names
}

#[test]
fn verify_new_folder_is_whole_and_leaves_nothing_beside_it() {
    let place = tempfile::tempdir().unwrap();
    let dir = place.path().join("deep").join("out");
    files::write_folder(&dir, &some_files(), false).unwrap();
    assert_eq!(
        listing(&dir),
        ["opening_a.svg", "record.csv", "record.json"]
    );
    assert_eq!(listing(&place.path().join("deep")), ["out"]);
}

#[test]
fn verify_replace_keeps_foreign_files_and_clears_our_stale_plots() {
    let place = tempfile::tempdir().unwrap();
    let dir = place.path().join("out");
    files::write_folder(&dir, &some_files(), false).unwrap();
    fs::write(dir.join("notes.txt"), "mine").unwrap();
    fs::write(dir.join("drawing.svg"), "<svg>mine</svg>").unwrap();
    let refused = files::write_folder(&dir, &some_files(), false).unwrap_err();
    assert!(refused.to_string().contains("--replace"), "{refused}");
    let mut fewer = some_files();
    fewer.pop();
    fewer[1].1 = b"second".to_vec();
    files::write_folder(&dir, &fewer, true).unwrap();
    assert_eq!(
        listing(&dir),
        ["drawing.svg", "notes.txt", "record.csv", "record.json"]
    );
    assert_eq!(fs::read(dir.join("record.csv")).unwrap(), b"second");
}

#[test]
fn verify_replace_leaves_a_folder_of_somebody_else_alone() {
    let place = tempfile::tempdir().unwrap();
    fs::write(place.path().join("record.csv"), "mine").unwrap();
    let refused = files::write_folder(place.path(), &some_files(), true).unwrap_err();
    assert!(refused.to_string().contains("record.csv"), "{refused}");
    assert_eq!(listing(place.path()), ["record.csv"]);
    assert_eq!(fs::read(place.path().join("record.csv")).unwrap(), b"mine");
}

#[test]
fn verify_a_file_in_the_place_of_the_folder_is_named() {
    let place = tempfile::tempdir().unwrap();
    let path = place.path().join("out");
    fs::write(&path, "mine").unwrap();
    let refused = files::write_folder(&path, &some_files(), true).unwrap_err();
    assert!(refused.to_string().contains("not a folder"), "{refused}");
    let below = files::write_folder(&path.join("deeper"), &some_files(), false).unwrap_err();
    assert!(below.to_string().contains("out"), "{below}");
}
