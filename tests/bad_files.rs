//! Bad scenario files: every fault at once, with its place and what would be
//! right. One file per kind of fault under `tests/bad/`.

#![allow(clippy::unwrap_used)]

use doorglow::scenario;

macro_rules! bad {
    ($($test:ident, $file:literal;)*) => {$(
        #[test]
        fn $test() {
            let text = include_str!(concat!("bad/", $file, ".toml"));
            let report = scenario::load(concat!($file, ".toml"), text, None).unwrap_err();
            insta::assert_snapshot!($file, report.render(false, 80));
        }
    )*};
}

bad! {
    verify_bad_syntax, "syntax";
    verify_bad_unknown_key, "unknown_key";
    verify_bad_missing_key, "missing_key";
    verify_bad_unit, "unit";
    verify_bad_out_of_range, "out_of_range";
    verify_bad_unknown_name, "unknown_name";
    verify_bad_does_not_fit, "does_not_fit";
    verify_bad_action, "action";
    verify_bad_same_name, "same_name";
    verify_bad_same_name_joins, "same_name_joins";
    verify_bad_item, "item";
    verify_bad_station, "station";
    verify_bad_fuel, "fuel";
    verify_bad_wrong_kind, "wrong_kind";
    verify_bad_tactic, "tactic";
    verify_bad_moving_air, "moving_air";
    verify_bad_condition, "condition";
    verify_bad_values_with_hints, "hints";
    verify_bad_doubled_action, "doubled_action";
}

/// Nothing here keeps the scenario from running, and each caution is shown.
#[test]
fn verify_cautions_do_not_stop_a_run() {
    let text = include_str!("bad/cautions.toml");
    let loaded = scenario::load_with_cautions("cautions.toml", text, None).unwrap();
    assert_eq!(loaded.cautions.errors().count(), 0);
    insta::assert_snapshot!("cautions", loaded.cautions.render(false, 80));
}

/// Faults of a models file are told in that file.
#[test]
fn verify_bad_models_file() {
    let scenario = "title = \"Own models\"\nduration = \"1 min\"\nmodels = \"own.toml\"\n";
    let models = include_str!("bad/models.toml").to_owned();
    let beside = |_: &str| Ok(models.clone());
    let report = scenario::load_beside("own_models.toml", scenario, None, &beside).unwrap_err();
    assert_eq!(report.file_name(), "own.toml");
    insta::assert_snapshot!("models", report.render(false, 80));
    let none = |_: &str| Err("no such file".to_owned());
    let report = scenario::load_beside("own_models.toml", scenario, None, &none).unwrap_err();
    insta::assert_snapshot!("no_models", report.render(false, 80));
}

#[test]
fn verify_bytes_that_are_no_text() {
    let report = scenario::text_from_bytes("latin.toml", b"title = \"caf\xe9\"".to_vec());
    insta::assert_snapshot!("latin", report.unwrap_err().render(false, 80));
}

#[test]
fn verify_colour_only_when_asked() {
    let text = include_str!("bad/unit.toml");
    let report = scenario::load("unit.toml", text, None).unwrap_err();
    assert!(!report.render(false, 80).contains('\u{1b}'));
    assert!(report.render(true, 80).contains('\u{1b}'));
}
