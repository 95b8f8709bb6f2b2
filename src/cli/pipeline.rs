//! The calls from scenario to files, in their order.

use super::arguments::Format;
use super::failure::Failure;
use super::faults;
use crate::plan::Plan;
use crate::reading::{self, Moment, Summary};
use crate::record::Record;
use crate::scenario::{self, Loaded};
use crate::{exposure, show, solve};
use std::fmt::Display;
use std::fs;
use std::path::Path;

/// The scenario as resolved, in the folder of results.
pub const SCENARIO_FILE: &str = "scenario.toml";

/// A scenario that can be run.
pub struct Read {
    /// Plan and cautions.
    pub loaded: Loaded,
    /// SHA-256 of the text, followed by that of its own models.
    pub hash: String,
}

/// A run and what was read off it.
pub struct Played {
    /// All histories.
    pub record: Record,
    /// The timeline.
    pub moments: Vec<Moment>,
    /// The run in a few numbers.
    pub summary: Summary,
}

/// Reads a scenario; faults are told on the way out.
///
/// # Errors
/// A file that cannot be read, or faults in it.
pub fn read(file: &Path, tactic: Option<&str>, format: Format) -> Result<Read, Failure> {
    let bytes = fs::read(file).map_err(|error| Failure::read(file, error))?;
    let name = file.display().to_string();
    let text =
        scenario::text_from_bytes(&name, bytes).map_err(|report| faults::tell(&report, format))?;
    let beside = |models: &str| {
        let path = file.with_file_name(models);
        let bytes = fs::read(&path).map_err(|error| error.to_string())?;
        String::from_utf8(bytes).map_err(|_| "it is not UTF-8 text".to_owned())
    };
    let loaded = scenario::load_beside(&name, &text, tactic, &beside)
        .map_err(|report| faults::tell(&report, format))?;
    // A run comes from the scenario and the models beside it.
    let models = loaded.models.as_ref().map_or("", |models| &models.text);
    Ok(Read {
        hash: scenario::hash(&format!("{text}{models}")),
        loaded,
    })
}

/// Runs a plan and reads the record.
///
/// # Errors
/// A plan that the solver cannot use.
pub fn play(
    plan: &Plan,
    every: f64,
    watch: &mut dyn FnMut(f64) -> bool,
) -> Result<Played, Failure> {
    let mut record =
        solve::run(plan, every, watch).map_err(|fault| Failure::Unusable(fault.to_string()))?;
    exposure::observe(&mut record, plan);
    let moments = reading::moments(&record, plan);
    let summary = reading::summary(&record, plan);
    Ok(Played {
        record,
        moments,
        summary,
    })
}

/// All result files in memory: name and bytes.
///
/// # Errors
/// When a table or plot could not be put together.
pub fn files(played: &Played, read: &Read) -> Result<Vec<(String, Vec<u8>)>, Failure> {
    let (record, plan) = (&played.record, &read.loaded.plan);
    let mut files = vec![
        (
            "record.csv".to_owned(),
            show::record_csv(record, plan).map_err(unexpected)?,
        ),
        (
            "record.json".to_owned(),
            show::record_json(record, plan, &read.hash).map_err(unexpected)?,
        ),
        (
            "timeline.csv".to_owned(),
            show::timeline_csv(&played.moments).map_err(unexpected)?,
        ),
        (
            SCENARIO_FILE.to_owned(),
            scenario::resolved_text(plan).into_bytes(),
        ),
    ];
    files.extend(show::plots::all(record, plan).map_err(unexpected)?);
    Ok(files)
}

/// Wraps what cannot happen in memory, so that it would be told and not hidden.
pub fn unexpected(error: impl Display) -> Failure {
    Failure::Unexpected(error.to_string())
}
