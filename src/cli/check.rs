//! `doorglow check`.

use super::arguments::{CheckOptions, Format};
use super::failure::{Done, Failure};
use super::{faults, pipeline, streams};
use crate::scenario;
use crate::show::PROGRAM_VERSION;
use serde_json::json;

/// Reads a scenario and says how it was understood.
///
/// # Errors
/// Faults in the scenario, a file that cannot be read, standard output that
/// cannot be written.
pub fn check(options: &CheckOptions) -> Result<Done, Failure> {
    let tactic = options.tactic.as_deref();
    let read = pipeline::read(&options.file, tactic, options.format)?;
    let plan = &read.loaded.plan;
    match options.format {
        Format::Text => {
            faults::caution(&read.loaded.cautions);
            streams::write(&scenario::building_and_tactics(plan, &read.loaded.tactics))?;
        }
        Format::Json => {
            let document = json!({
                "program": "doorglow",
                "program_version": PROGRAM_VERSION,
                "usable": true,
                "scenario_hash": read.hash,
                "faults": faults::as_json(&read.loaded.cautions),
                "tactics": read.loaded.tactics.iter().map(|tactic| json!({
                    "name": tactic.name,
                    "note": tactic.note,
                })).collect::<Vec<_>>(),
                "plan": plan,
            });
            streams::write(&format!("{document:#}\n"))?;
        }
    }
    Ok(Done::Fine)
}
