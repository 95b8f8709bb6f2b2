//! `doorglow run`: files, streams and exit codes.

#![allow(clippy::unwrap_used)]

#[allow(dead_code)]
mod command;

use command::{Place, out, side};
use std::fs;
use std::io::{BufRead, BufReader};
use std::process::Stdio;

const FILES: [&str; 9] = [
    "heat_release.svg",
    "opening_door.svg",
    "oxygen_and_fuel.svg",
    "record.csv",
    "record.json",
    "scenario.toml",
    "station_crew.svg",
    "temperatures.svg",
    "timeline.csv",
];

#[test]
fn cli_run_shows_results_and_writes_the_folder_beside_the_scenario() {
    let place = Place::new();
    let output = place.run(&["run", "reed.toml"]);
    assert_eq!(output.status.code(), Some(0), "{}", side(&output));
    assert!(out(&output).contains("Reed Lane 2"));
    assert!(out(&output).contains("0:20"), "{}", out(&output));
    assert!(side(&output).contains("9 files written to reed"));
    assert_eq!(place.names("reed"), FILES);
    assert_eq!(place.names("."), ["reed", "reed.toml"]);
}

#[test]
fn cli_run_twice_shows_the_same_results_and_keeps_the_files() {
    let place = Place::new();
    let first = place.run(&["run", "reed.toml"]);
    place.write("reed/record.csv", "touched");
    let second = place.run(&["run", "reed.toml"]);
    assert_eq!(second.status.code(), Some(0));
    assert_eq!(out(&first), out(&second));
    let last = side(&second).trim_end().lines().last().unwrap().to_owned();
    for words in ["EARLIER run", "same scenario", "not changed", "--replace"] {
        assert!(last.contains(words), "{last}");
    }
    assert_eq!(
        fs::read_to_string(place.path("reed/record.csv")).unwrap(),
        "touched"
    );
    let third = place.run(&["run", "reed.toml", "--replace"]);
    assert_eq!(third.status.code(), Some(0), "{}", side(&third));
    assert_ne!(
        fs::read_to_string(place.path("reed/record.csv")).unwrap(),
        "touched"
    );
}

#[test]
fn cli_earlier_results_of_another_scenario_are_not_called_the_same() {
    let place = Place::new();
    place.run(&["run", "reed.toml"]);
    let changed = command::SCENARIO.replace("\"800 kW\"", "\"900 kW\"");
    place.write("reed.toml", &changed);
    let output = place.run(&["run", "reed.toml"]);
    assert_eq!(output.status.code(), Some(0));
    assert!(side(&output).contains("EARLIER run"), "{}", side(&output));
    assert!(!side(&output).contains("same scenario"));
}

#[test]
fn cli_columns_set_the_width() {
    let place = Place::new();
    for (columns, most) in [("20", 50), ("60", 60), ("500", 120)] {
        let mut command = place.command(&["run", "reed.toml", "--replace"]);
        let output = command.env("COLUMNS", columns).output().unwrap();
        let widest = out(&output).lines().map(|line| line.chars().count()).max();
        assert!(widest.unwrap() <= most, "{columns}: {widest:?}");
    }
}

#[test]
fn cli_run_gives_the_same_bytes_each_time() {
    let place = Place::new();
    for folder in ["one", "two"] {
        let output = place.run(&["run", "reed.toml", "--out", folder]);
        assert_eq!(output.status.code(), Some(0));
    }
    for name in FILES {
        let read = |folder: &str| fs::read(place.path(folder).join(name)).unwrap();
        assert!(read("one") == read("two"), "{name} differs");
    }
}

#[test]
fn cli_resolved_scenario_runs_to_the_same_results() {
    let place = Place::new();
    let first = place.run(&["run", "reed.toml"]);
    let again = place.run(&["run", "reed/scenario.toml", "--out", "again"]);
    assert_eq!(again.status.code(), Some(0), "{}", side(&again));
    assert_eq!(out(&first), out(&again));
}

#[test]
fn cli_tactic_has_its_own_folder_and_its_actions() {
    let place = Place::new();
    let output = place.run(&["run", "reed.toml", "--tactic", "hold"]);
    assert_eq!(output.status.code(), Some(0), "{}", side(&output));
    assert_eq!(place.names("reed-hold"), FILES);
    assert!(out(&output).contains("0:30"), "{}", out(&output));
    let unknown = place.run(&["run", "reed.toml", "--tactic", "hald"]);
    assert_eq!(unknown.status.code(), Some(2));
    assert!(side(&unknown).contains("hold"), "{}", side(&unknown));
}

#[test]
fn cli_folder_asked_for_by_name_is_not_overwritten() {
    let place = Place::new();
    fs::create_dir(place.path("mine")).unwrap();
    let output = place.run(&["run", "reed.toml", "--out", "mine"]);
    assert_eq!(output.status.code(), Some(4));
    assert_eq!(out(&output), "");
    assert!(side(&output).contains("mine") && side(&output).contains("--replace"));
    assert!(place.names("mine").is_empty());
}

#[test]
fn cli_results_never_overwrite_the_scenario_itself() {
    let place = Place::new();
    place.write("scenario.toml", command::SCENARIO);
    let output = place.run(&["run", "scenario.toml", "--out", ".", "--replace"]);
    assert_eq!(output.status.code(), Some(2), "{}", side(&output));
    let kept = fs::read_to_string(place.path("scenario.toml")).unwrap();
    assert_eq!(kept, command::SCENARIO);
    assert_eq!(place.names("."), ["reed.toml", "scenario.toml"]);
}

#[test]
fn cli_folder_below_a_file_is_named() {
    let place = Place::new();
    place.write("taken", "a file, not a folder");
    let output = place.run(&["run", "reed.toml", "--out", "taken/deeper"]);
    assert_eq!(output.status.code(), Some(4));
    assert!(side(&output).contains("taken"), "{}", side(&output));
}

/// Not even an administrator can make a folder there.
#[cfg(target_os = "linux")]
#[test]
fn cli_folder_that_cannot_be_made_is_named_and_results_are_shown() {
    let place = Place::new();
    let output = place.run(&["run", "reed.toml", "--out", "/proc/doorglow"]);
    assert_eq!(output.status.code(), Some(4));
    assert!(side(&output).contains("/proc"), "{}", side(&output));
    assert!(out(&output).contains("Reed Lane 2"));
}

/// A full disk under standard output.
#[cfg(target_os = "linux")]
#[test]
fn cli_standard_output_that_refuses_is_told() {
    let place = Place::new();
    let full = fs::OpenOptions::new()
        .write(true)
        .open("/dev/full")
        .unwrap();
    let output = std::process::Command::new(assert_cmd::cargo::cargo_bin("doorglow"))
        .args(["run", "reed.toml"])
        .current_dir(place.path("."))
        .stdout(full)
        .output()
        .unwrap();
    assert_eq!(output.status.code(), Some(4));
    assert!(
        side(&output).contains("standard output"),
        "{}",
        side(&output)
    );
    assert_eq!(place.names("reed"), FILES);
}

#[test]
fn cli_json_is_one_document_on_standard_output() {
    let place = Place::new();
    let output = place.run(&["run", "reed.toml", "--format", "json"]);
    assert_eq!(output.status.code(), Some(0));
    let json: serde_json::Value = serde_json::from_slice(&output.stdout).unwrap();
    assert_eq!(json["program"], "doorglow");
    assert_eq!(json["scenario_hash"].as_str().unwrap().len(), 64);
    assert!(!json["moments"].as_array().unwrap().is_empty());
    let record = fs::read(place.path("reed/record.json")).unwrap();
    let record: serde_json::Value = serde_json::from_slice(&record).unwrap();
    assert_eq!(record["scenario_hash"], json["scenario_hash"]);
}

#[test]
fn cli_every_sets_the_rows() {
    let place = Place::new();
    let rows = |every: &str, folder: &str| {
        let output = place.run(&["run", "reed.toml", "--every", every, "--out", folder]);
        assert_eq!(output.status.code(), Some(0), "{}", side(&output));
        let table = fs::read_to_string(place.path(folder).join("record.csv")).unwrap();
        table.lines().count()
    };
    assert!(rows("0.5 s", "fine") > rows("5 s", "coarse") + 60);
}

#[test]
fn cli_piped_output_has_no_escape_codes() {
    let place = Place::new();
    for force in [false, true] {
        let mut command = place.command(&["run", "reed.toml", "--details", "--replace"]);
        if force {
            command.env("NO_COLOR", "1");
        }
        let output = command.output().unwrap();
        assert!(!out(&output).contains('\u{1b}'));
        assert!(!side(&output).contains('\u{1b}'));
    }
}

#[test]
fn cli_reader_that_leaves_early_is_no_fault() {
    let place = Place::new();
    let mut child = std::process::Command::new(assert_cmd::cargo::cargo_bin("doorglow"))
        .args(["run", "reed.toml", "--format", "json"])
        .current_dir(place.path("."))
        .stdout(Stdio::piped())
        .stderr(Stdio::null())
        .spawn()
        .unwrap();
    drop(child.stdout.take());
    assert_eq!(child.wait().unwrap().code(), Some(0));
    assert_eq!(place.names("reed"), FILES);
}

/// A run long enough to be caught in the act; the caution about a tactic that
/// changes nothing says that the program has begun to listen.
#[cfg(unix)]
#[test]
fn cli_interrupt_keeps_what_exists() {
    let place = Place::new();
    let long = command::SCENARIO.replace("\"40 s\"", "\"24 h\"");
    place.write(
        "long.toml",
        &format!("{long}\n[tactic.idle]\nnote = \"-\"\n"),
    );
    let mut child = std::process::Command::new(assert_cmd::cargo::cargo_bin("doorglow"))
        .args(["run", "long.toml", "--every", "0.1 s"])
        .current_dir(place.path("."))
        .stdout(Stdio::null())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    let mut lines = BufReader::new(child.stderr.take().unwrap()).lines();
    let first = lines.next().unwrap().unwrap();
    let sent = std::process::Command::new("kill")
        .args(["-INT", &child.id().to_string()])
        .status()
        .unwrap();
    assert!(sent.success());
    let told: Vec<String> = lines.map(Result::unwrap).collect();
    assert_eq!(child.wait().unwrap().code(), Some(130), "{first} {told:?}");
    assert!(told.iter().any(|line| line.contains("Stopped by you")));
    assert!(place.path("long/record.csv").exists());
}
