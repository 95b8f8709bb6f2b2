//! The scenario as the user writes it: reading, every check with its located
//! message, and the plan that comes out.
//!
//! [`load`] reads in two stages. The first (`read`) takes TOML, keys, units and
//! ranges by the one table of `fields`; the second (`resolve`) looks names up
//! and sees whether things go together. Both note every fault they find.

mod building;
mod fault;
mod fields;
mod hand;
mod names;
mod own_models;
mod read;
mod reference;
mod resolve;
mod resolved;

pub use building::{building_and_tactics, building_text};
pub use fault::{Fault, Report, Severity, code};
pub use own_models::{Beside, Models};
pub use reference::reference_page;
pub use resolved::resolved_text;

use crate::plan::Plan;
use sha2::{Digest, Sha256};
use std::fmt::Write as _;

/// A tactic that a scenario offers.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Offered {
    /// Its name, for `--tactic`.
    pub name: String,
    /// What the file notes about it.
    pub note: Option<String>,
}

/// A plan and what looks odd about it.
#[derive(Debug, Clone)]
pub struct Loaded {
    /// The plan.
    pub plan: Plan,
    /// The user's own models file, when the scenario names one.
    pub models: Option<Models>,
    /// The tactics that can be played, in the order of the file.
    pub tactics: Vec<Offered>,
    /// Cautions; nothing that keeps it from running.
    pub cautions: Report,
}

/// Reads a scenario and resolves it; `tactic` names the tactic that is played.
///
/// # Errors
/// All faults at once, each with its place and what would be right.
pub fn load(file_name: &str, text: &str, tactic: Option<&str>) -> Result<Plan, Report> {
    load_with_cautions(file_name, text, tactic).map(|loaded| loaded.plan)
}

/// As [`load`], with the cautions beside the plan.
///
/// # Errors
/// As [`load`].
pub fn load_with_cautions(
    file_name: &str,
    text: &str,
    tactic: Option<&str>,
) -> Result<Loaded, Report> {
    load_beside(file_name, text, tactic, &|_| {
        Err("only a scenario in a folder has files beside it".to_owned())
    })
}

/// As [`load_with_cautions`], with a way to the files beside the scenario: the
/// user's own models.
///
/// # Errors
/// As [`load`]; faults of the models file come in a report of their own.
pub fn load_beside(
    file_name: &str,
    text: &str,
    tactic: Option<&str>,
    beside: Beside<'_>,
) -> Result<Loaded, Report> {
    if text.len() > read::LARGEST_FILE {
        let fault = Fault::elsewhere(
            code::TOO_MUCH,
            format!("{file_name} is larger than 1 MiB; a scenario is a few kilobytes"),
        );
        return Err(Report::new(file_name, "", vec![fault]));
    }
    let mut faults = Vec::new();
    let models = own_models::beside(text, beside).unwrap_or_else(|fault| {
        faults.push(fault);
        None
    });
    let catalogue = own_models::with_own(models.as_ref())?;
    let sheet = read::sheet(text, &catalogue, &mut faults);
    let (plan, found) = resolve::resolve(&sheet, &catalogue, tactic);
    if faults.iter().any(|fault| fault.code == code::SYNTAX) {
        // A broken table makes names unknown and keys missing that are there.
        faults.extend(
            found
                .into_iter()
                .filter(|fault| ![code::UNKNOWN_NAME, code::MISSING_KEY].contains(&fault.code)),
        );
    } else {
        faults.extend(found);
    }
    if faults.iter().any(|fault| fault.severity == Severity::Error) {
        // Cautions of a plan with holes in it would mislead.
        faults.retain(|fault| fault.severity == Severity::Error);
        return Err(Report::new(file_name, text, faults));
    }
    let report = Report::new(file_name, text, faults);
    Ok(Loaded {
        plan,
        models,
        tactics: offered(&sheet),
        cautions: report,
    })
}

fn offered(sheet: &read::Sheet) -> Vec<Offered> {
    let tactics = sheet.tactics.iter().map(|tactic| Offered {
        name: tactic.named.name.value.clone(),
        note: tactic.named.values.text("note").map(str::to_owned),
    });
    tactics.collect()
}

/// Text of a file from its bytes.
///
/// # Errors
/// A report when the bytes are not UTF-8, with the line of the first that is
/// not.
pub fn text_from_bytes(file_name: &str, bytes: Vec<u8>) -> Result<String, Report> {
    String::from_utf8(bytes).map_err(|error| {
        let good = error.utf8_error().valid_up_to();
        let bytes = error.as_bytes();
        let line = bytes[..good].split(|byte| *byte == b'\n').count();
        let fault = Fault::elsewhere(
            code::SYNTAX,
            format!("{file_name} is not UTF-8 text: line {line} has a byte that cannot be read"),
        )
        .help("save the file as UTF-8");
        Report::new(file_name, "", vec![fault])
    })
}

/// SHA-256 of a scenario text, in hexadecimal, by which a record names the
/// scenario it came from.
pub fn hash(text: &str) -> String {
    Sha256::digest(text.as_bytes())
        .iter()
        .fold(String::with_capacity(64), |mut hex, byte| {
            // Writing to a string cannot fail.
            let _ = write!(hex, "{byte:02x}");
            hex
        })
}
