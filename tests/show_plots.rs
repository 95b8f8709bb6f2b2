//! Plots of an invented record: what they say, not megabytes of how.

#![allow(clippy::unwrap_used)]

mod invented;

use doorglow::show::{CAUTION, plots};

fn drawn() -> Vec<(String, String)> {
    plots::all(&invented::record(), &invented::plan())
        .unwrap()
        .into_iter()
        .map(|(name, bytes)| (name, String::from_utf8(bytes).unwrap()))
        .collect()
}

/// The texts of a plot in drawing order, numbers of axes left out.
fn words(svg: &str) -> Vec<String> {
    svg.split("<text")
        .skip(1)
        .filter_map(|part| part.split_once('>')?.1.split_once("</text>"))
        .map(|(text, _)| text.trim().to_owned())
        .filter(|text| text.parse::<f64>().is_err())
        .collect()
}

#[test]
fn regress_plots_say_what_they_show() {
    let all: Vec<String> = drawn()
        .iter()
        .map(|(name, svg)| format!("{name}\n  {}", words(svg).join("\n  ")))
        .collect();
    insta::assert_snapshot!(all.join("\n"));
}

#[test]
fn verify_every_plot_is_complete_and_small() {
    for (name, svg) in drawn() {
        assert!(svg.contains(CAUTION), "{name} has no caution");
        assert!(svg.contains(env!("CARGO_PKG_VERSION")), "{name}");
        assert!(svg.contains("tactic: hold the door"), "{name}");
        assert!(!svg.contains("NaN") && !svg.contains("inf"), "{name}");
        assert!(svg.len() < 400_000, "{name} has {} bytes", svg.len());
        assert_eq!(svg.matches("<svg").count(), 1);
        assert!(svg.trim_end().ends_with("</svg>"), "{name}");
    }
}

#[test]
fn verify_same_record_same_bytes() {
    assert_eq!(drawn(), drawn());
}

#[test]
fn verify_broken_records_still_draw() {
    let plan = invented::plan();
    let whole = invented::record();
    for keep in [0, 1, 2] {
        let mut record = whole.clone();
        record.time.truncate(keep);
        for column in &mut record.columns {
            column.values.truncate(keep);
        }
        assert!(plots::all(&record, &plan).is_ok());
    }
    let mut record = whole.clone();
    for column in &mut record.columns {
        column.values.fill(f64::NAN);
    }
    assert!(plots::all(&record, &plan).is_ok());
    let mut record = whole;
    for column in &mut record.columns {
        column.values.fill(f64::INFINITY);
    }
    assert!(plots::all(&record, &plan).is_ok());
}

#[test]
fn verify_names_that_clash_as_files_stay_apart() {
    let mut plan = invented::plan();
    let mut record = invented::record();
    for (index, name) in ["a/b", "A b"].into_iter().enumerate() {
        plan.openings[index].name = name.to_owned();
        record.names.openings[index] = name.to_owned();
    }
    let names: Vec<String> = plots::all(&record, &plan)
        .unwrap()
        .into_iter()
        .map(|(name, _)| name)
        .collect();
    assert!(names.contains(&"opening_a_b.svg".to_owned()), "{names:?}");
    assert!(names.contains(&"opening_A_b_2.svg".to_owned()), "{names:?}");
}
