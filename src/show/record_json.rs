//! The record as one JSON document: everything, unrounded, in SI.

use super::quantity::si_unit;
use super::words::label;
use super::{CAUTION, PROGRAM_VERSION};
use crate::plan::Plan;
use crate::record::{Column, Ended, Record, Subject};
use serde::Serialize;
use serde_json::{Error, Map, Value, json, to_value};

/// Version of the layout of `record.json`; raised when a reader written for
/// the last one would misread it.
pub const SCHEMA_VERSION: u32 = 1;

/// The record as JSON: what was run (title, tactic, hash of the scenario
/// text), how it ended, what to know about it, and every history in SI with
/// its unit. One history a line, `null` where there is no value; the same run
/// gives the same bytes.
///
/// # Errors
/// When a value cannot be written as JSON.
pub fn record_json(record: &Record, plan: &Plan, scenario_hash: &str) -> Result<Vec<u8>, Error> {
    let mut lines = vec!["{".to_owned()];
    for (name, value) in head(record, plan, scenario_hash)? {
        lines.push(format!("{}: {value},", Value::from(name)));
    }
    let times = Times {
        unit: "s",
        values: &record.time,
    };
    lines.push(format!("\"time\": {},", serde_json::to_string(&times)?));
    lines.push("\"columns\": [".to_owned());
    for (index, column) in record.columns.iter().enumerate() {
        let is_last = index + 1 == record.columns.len();
        let comma = if is_last { "" } else { "," };
        let history = serde_json::to_string(&History::of(record, plan, column))?;
        lines.push(format!("{history}{comma}"));
    }
    lines.push("]\n}\n".to_owned());
    Ok(lines.join("\n").into_bytes())
}

/// How the run ended, for machines.
fn ended_json(ended: &Ended) -> Value {
    match ended {
        Ended::Completed => json!({ "how": "completed" }),
        Ended::Interrupted(time) => json!({ "how": "stopped by the user", "time": time }),
        Ended::Failed(time, reason) => {
            json!({ "how": "could not go on", "time": time, "reason": reason })
        }
    }
}

fn head(record: &Record, plan: &Plan, hash: &str) -> Result<Vec<(&'static str, Value)>, Error> {
    Ok(vec![
        ("program", json!("doorglow")),
        ("program_version", json!(PROGRAM_VERSION)),
        ("schema_version", json!(SCHEMA_VERSION)),
        ("caution", json!(CAUTION)),
        ("title", json!(plan.title)),
        ("tactic", json!(plan.tactic)),
        ("scenario_hash", json!(hash)),
        ("ended", ended_json(&record.ended)),
        ("flags", to_value(&record.flags)?),
        ("names", to_value(&record.names)?),
        ("ledger", ledger(record)?),
        ("work", to_value(record.work)?),
    ])
}

fn ledger(record: &Record) -> Result<Value, Error> {
    let mut all = Map::new();
    for (name, unit, closure) in [
        ("mass", "kg", record.ledger.mass),
        ("energy", "J", record.ledger.energy),
        ("oxygen", "kg", record.ledger.oxygen),
        ("carbon", "kg", record.ledger.carbon),
    ] {
        let mut value = to_value(closure)?;
        value["unit"] = json!(unit);
        all.insert(name.to_owned(), value);
    }
    Ok(Value::Object(all))
}

#[derive(Serialize)]
struct Times<'a> {
    unit: &'static str,
    values: &'a [f64],
}

#[derive(Serialize)]
struct History<'a> {
    kind: &'static str,
    of: &'a str,
    quantity: String,
    unit: &'static str,
    meaning: &'static str,
    values: &'a [f64],
}

impl<'a> History<'a> {
    fn of(record: &'a Record, plan: &Plan, column: &'a Column) -> Self {
        Self {
            kind: match column.subject {
                Subject::House => "house",
                Subject::Room(_) => "room",
                Subject::Opening(_) => "opening",
                Subject::Item(_) => "item",
                Subject::Station(_) => "station",
            },
            of: record.name(column.subject),
            quantity: label(plan, column),
            unit: si_unit(column.quantity.dimension()),
            meaning: column.quantity.meaning(),
            values: &column.values,
        }
    }
}
