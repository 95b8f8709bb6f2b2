//! What `--format json` writes: moments, summary, ledger and flags, SI.

use serde::Serialize;

use super::PROGRAM_VERSION;
use super::text::CAUTIONS;
use crate::plan::Plan;
use crate::reading::{BAND_SOURCE, Moment, Summary};
use crate::record::{Ended, Flag, Ledger, Record, Work};

/// Version of the form of this document; it grows when a field changes its
/// meaning or goes.
pub const RUN_SCHEMA_VERSION: u32 = 1;

/// A run as read, ready to be written as JSON. All numbers SI; a missing
/// number is null.
#[derive(Debug, Clone, Serialize)]
pub struct RunReading<'a> {
    /// Version of this form.
    pub schema_version: u32,
    /// Version of the program.
    pub program_version: &'static str,
    /// What stands over every report.
    pub cautions: &'static str,
    /// Title of the scenario.
    pub title: &'a str,
    /// Tactic played, if any.
    pub tactic: Option<&'a str>,
    /// How the run ended.
    pub ended: &'a Ended,
    /// Where the bands come from.
    pub band_source: &'static str,
    /// The timeline.
    pub moments: &'a [Moment],
    /// The run in a few numbers.
    pub summary: &'a Summary,
    /// The run's own audit.
    pub ledger: &'a Ledger,
    /// Work counters.
    pub work: &'a Work,
    /// What a user should know.
    pub flags: &'a [Flag],
}

impl<'a> RunReading<'a> {
    /// Gathers a run.
    pub fn new(
        record: &'a Record,
        plan: &'a Plan,
        moments: &'a [Moment],
        summary: &'a Summary,
    ) -> Self {
        Self {
            schema_version: RUN_SCHEMA_VERSION,
            program_version: PROGRAM_VERSION,
            cautions: CAUTIONS,
            title: &plan.title,
            tactic: plan.tactic.as_deref(),
            ended: &record.ended,
            band_source: BAND_SOURCE,
            moments,
            summary,
            ledger: &record.ledger,
            work: &record.work,
            flags: &record.flags,
        }
    }
}
