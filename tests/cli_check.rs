//! `doorglow check`, `doorglow catalogue`, help, and files that cannot be used.

#![allow(clippy::unwrap_used)]

#[allow(dead_code)]
mod command;

use command::{Place, SCENARIO, out, side};

fn broken() -> String {
    SCENARIO
        .replace("\"3.0 m\"", "\"3.0 kg\"")
        .replace("\"polyurethane mattress with bedding\"", "\"moonstone\"")
}

#[test]
fn cli_bad_file_tells_all_faults_and_writes_nothing() {
    let place = Place::new();
    place.write("bad.toml", &broken());
    for command in ["run", "check"] {
        let output = place.run(&[command, "bad.toml"]);
        assert_eq!(output.status.code(), Some(2));
        assert_eq!(out(&output), "");
        for word in ["bad.toml", "kg", "moonstone"] {
            assert!(side(&output).contains(word), "{}", side(&output));
        }
        assert_eq!(place.names("."), ["bad.toml", "reed.toml"]);
    }
}

/// A models file lies beside the scenario; its faults name it, and it is part
/// of what a run came from.
#[test]
fn cli_own_models_lie_beside_the_scenario() {
    let place = Place::new();
    let scenario = SCENARIO
        .replacen("duration", "models = \"own.toml\"\nduration", 1)
        .replace("\"polyurethane mattress with bedding\"", "\"moonstone\"");
    place.write("own_models.toml", &scenario);
    let check = || place.run(&["check", "own_models.toml", "--format", "json"]);
    let json = |output: &std::process::Output| -> serde_json::Value {
        serde_json::from_slice(&output.stdout).unwrap()
    };
    let output = check();
    assert_eq!(output.status.code(), Some(2));
    assert!(side(&output).contains("own.toml"), "{}", side(&output));
    let fuel = "[[fuel]]\nname = \"moonstone\"\nlike = \"wood\"\n";
    place.write("own.toml", fuel);
    let output = check();
    assert_eq!(output.status.code(), Some(2));
    assert_eq!(json(&output)["faults"][0]["file"], "own.toml");
    place.write("own.toml", &format!("{fuel}source = \"invented\"\n"));
    let first = check();
    assert_eq!(first.status.code(), Some(0), "{}", side(&first));
    let soot = format!("{fuel}source = \"invented\"\nsoot_yield = 0.02\n");
    place.write("own.toml", &soot);
    let second = check();
    assert_eq!(json(&second)["plan"]["fuels"][0]["soot_yield"], 0.02);
    assert_ne!(
        json(&first)["scenario_hash"],
        json(&second)["scenario_hash"]
    );
}

#[test]
fn cli_faults_as_json() {
    let place = Place::new();
    place.write("bad.toml", &broken());
    let output = place.run(&["check", "bad.toml", "--format", "json"]);
    assert_eq!(output.status.code(), Some(2));
    let json: serde_json::Value = serde_json::from_slice(&output.stdout).unwrap();
    assert_eq!(json["usable"], false);
    let faults = json["faults"].as_array().unwrap();
    assert!(faults.len() >= 3, "{faults:?}");
    assert_eq!(faults[0]["line"], 6);
    assert_eq!(faults[0]["severity"], "error");
}

#[test]
fn cli_check_reads_the_building_and_writes_nothing() {
    let place = Place::new();
    let output = place.run(&["check", "reed.toml"]);
    assert_eq!(output.status.code(), Some(0), "{}", side(&output));
    assert!(out(&output).contains("kitchen"));
    assert_eq!(place.names("."), ["reed.toml"]);
    let output = place.run(&["check", "reed.toml", "--format", "json"]);
    let json: serde_json::Value = serde_json::from_slice(&output.stdout).unwrap();
    assert_eq!(json["usable"], true);
    assert_eq!(json["plan"]["rooms"][0]["name"], "kitchen");
}

#[test]
fn cli_file_that_cannot_be_read_is_named() {
    let place = Place::new();
    for command in ["run", "check"] {
        let output = place.run(&[command, "nowhere.toml"]);
        assert_eq!(output.status.code(), Some(4));
        assert!(side(&output).contains("nowhere.toml"), "{}", side(&output));
        let output = place.run(&[command, "."]);
        assert_eq!(output.status.code(), Some(4));
    }
}

#[test]
fn cli_bytes_that_are_no_text_are_a_fault_of_the_scenario() {
    let place = Place::new();
    std::fs::write(place.path("odd.toml"), b"title = \"\xff\"").unwrap();
    let output = place.run(&["run", "odd.toml"]);
    assert_eq!(output.status.code(), Some(2));
    assert!(side(&output).contains("odd.toml"));
}

#[test]
fn cli_arguments_that_make_no_sense_exit_2() {
    let place = Place::new();
    for arguments in [
        &["run"][..],
        &["run", "reed.toml", "--every", "1"],
        &["run", "reed.toml", "--every", "0 s"],
        &["run", "reed.toml", "--format", "xml"],
        &["dance"],
        &[],
    ] {
        let output = place.run(arguments);
        assert_eq!(output.status.code(), Some(2), "{arguments:?}");
        assert_eq!(out(&output), "");
        assert_eq!(place.names("."), ["reed.toml"]);
    }
}

#[test]
fn cli_help_carries_the_caution_and_examples() {
    let place = Place::new();
    for arguments in [&["--help"][..], &["run", "--help"]] {
        let output = place.run(arguments);
        assert_eq!(output.status.code(), Some(0));
        let help = out(&output)
            .split_whitespace()
            .collect::<Vec<_>>()
            .join(" ");
        assert!(
            help.contains("Not for decisions at a live incident"),
            "{help}"
        );
        assert!(help.contains("Examples:"));
    }
}

#[test]
fn cli_catalogue_lists_sources() {
    let place = Place::new();
    let output = place.run(&["catalogue"]);
    assert_eq!(output.status.code(), Some(0));
    assert!(out(&output).contains("gypsum plasterboard 13 mm"));
    assert!(out(&output).contains("source"));
    let output = place.run(&["catalogue", "--format", "json"]);
    let json: serde_json::Value = serde_json::from_slice(&output.stdout).unwrap();
    assert!(!json["fuels"].as_array().unwrap().is_empty());
}
