//! What `--details` adds: the ledger in full, work counters, flags and the
//! sub-models in use.

use super::lines::Page;
use super::values::clock;
use crate::plan::{Choices, Plan};
use crate::reading::spoken;
use crate::record::{Closure, Record};

/// Writes the details.
pub(super) fn write(page: &mut Page, record: &Record, plan: &Plan) {
    ledger(page, record);
    flags(page, record);
    choices(page, plan);
    work(page, record);
}

fn ledger(page: &mut Page, record: &Record) {
    page.heading("LEDGER");
    let ledger = &record.ledger;
    let rows = [
        ("mass, kg", ledger.mass, 1.0),
        ("energy, MJ", ledger.energy, 1e-6),
        ("oxygen, kg", ledger.oxygen, 1.0),
        ("carbon, kg", ledger.carbon, 1.0),
    ];
    for (label, closure, scale) in rows {
        page.entry(label, &closure_words(&closure, scale));
    }
}

fn closure_words(closure: &Closure, scale: f64) -> String {
    format!(
        "at start {:.4}, gained {:.4}, lost {:.4}, at end {:.4}; closes to {:.1e}",
        closure.at_start * scale,
        closure.gained * scale,
        closure.lost * scale,
        closure.at_end * scale,
        closure.relative,
    )
}

fn flags(page: &mut Page, record: &Record) {
    page.heading("WHERE TO DOUBT THE MODEL");
    if record.flags.is_empty() {
        page.paragraph("Nothing was flagged. That is no proof.");
    }
    for flag in &record.flags {
        let label = format!("from {}", clock(flag.since));
        page.entry(
            &label,
            &format!("{} ({} in all)", flag.what, clock(flag.duration)),
        );
    }
}

/// Sub-models and coefficients; those that differ from the default say so.
fn choices(page: &mut Page, plan: &Plan) {
    page.heading("SUB-MODELS IN USE");
    let used = named_values(&plan.choices);
    let defaults = named_values(&Choices::default());
    for (name, value) in used {
        let default = defaults.iter().find(|(other, _)| *other == name);
        let changed = match default {
            Some((_, default)) if *default != value => {
                format!(" (default {})", with_unit(&name, default))
            }
            _ => String::new(),
        };
        let value = with_unit(&name, &value);
        page.entry(&spoken(&name), &format!("{value}{changed}"));
    }
}

/// Names and values of all choices, in alphabetical order.
fn named_values(choices: &Choices) -> Vec<(String, String)> {
    let Ok(serde_json::Value::Object(fields)) = serde_json::to_value(choices) else {
        return Vec::new();
    };
    let written = |value: serde_json::Value| match value {
        serde_json::Value::String(text) => text,
        other => other.to_string(),
    };
    fields
        .into_iter()
        .map(|(name, value)| (name, written(value)))
        .collect()
}

/// A choice with its unit; temperatures, which are kept in K, in °C.
fn with_unit(name: &str, value: &str) -> String {
    match (unit(name), value.parse::<f64>()) {
        (" K", Ok(kelvin)) => format!("{:.0} °C", kelvin - 273.15),
        (unit, _) => format!("{value}{unit}"),
    }
}

/// Unit of a choice by its name, with a space before it.
fn unit(name: &str) -> &'static str {
    match name {
        "convection_upper" | "convection_lower" | "convection_behind" => " W/m2/K",
        "critical_flame_temperature" | "autoignition_start" | "autoignition_full" => " K",
        "profile_thickness" => " m",
        "ember_life" | "breathing_lag" | "jet_lag" => " s",
        name if name.ends_with("_time") => " s",
        _ => "",
    }
}

fn work(page: &mut Page, record: &Record) {
    page.heading("WORK");
    let work = &record.work;
    page.paragraph(&format!(
        "{} evaluations in {} steps, {} rejected; {} iterations of the pressure balance; guards \
         touched in {} evaluations.",
        work.evaluations, work.steps, work.rejections, work.newton_iterations, work.guards,
    ));
}
