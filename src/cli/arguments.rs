//! What can be said on the command line.

use crate::units;
use clap::{Args, Parser, Subcommand, ValueEnum};
use std::path::PathBuf;

const ABOUT: &str = "What a room does when a door is opened on a fire short of air";

const LONG_ABOUT: &str = "\
What a room does when a door is opened on a fire short of air.

doorglow reads a scenario (a few rooms, what burns, what the crew does when) and works out \
layer temperatures, smoke level, oxygen, heat release, flows through every opening and the \
conditions where people are: as a timeline, as tables and as plots.

For planning and teaching only. Not for decisions at a live incident, not for choosing to enter, \
not as proof of a cause. It approves nothing; local procedures rule.";

const EXAMPLES: &str = "\
Examples:
  doorglow run scenarios/larch-row-3.toml
  doorglow run scenarios/larch-row-3.toml --tactic hold_the_door
  doorglow check my-house.toml
  doorglow catalogue

Exit codes:
  0    fine
  1    something unexpected
  2    the scenario or the arguments cannot be used; nothing was written
  3    the run could not go on; what exists is kept, and it says where and why
  4    a file could not be read or written; it says which
  130  stopped by Ctrl-C; what exists is kept";

const RUN_ABOUT: &str = "\
Play a scenario and show what the fire does.

The timeline and a summary go to standard output. Tables (record.csv, record.json, timeline.csv), \
the scenario with every default written out (scenario.toml) and plots (SVG) go to a folder.

For planning and teaching only. Not for decisions at a live incident.";

const RUN_EXAMPLES: &str = "\
Examples:
  doorglow run larch-row-3.toml                  results in the folder larch-row-3
  doorglow run larch-row-3.toml --replace        the same, over the results of an earlier run
  doorglow run larch-row-3.toml --tactic hold_the_door --out held
  doorglow run larch-row-3.toml --format json    timeline and summary for another program";

const CHECK_ABOUT: &str = "\
Read a scenario, run nothing.

Every fault is shown at once, with its place in the file and what would be right. Without faults, \
a short reading of the building shows how the scenario was understood. Nothing is written.";

/// The command line.
#[derive(Debug, Parser)]
#[command(name = "doorglow", version, about = ABOUT, long_about = LONG_ABOUT)]
#[command(after_help = EXAMPLES, subcommand_required = true, arg_required_else_help = true)]
pub struct Arguments {
    /// What to do.
    #[command(subcommand)]
    pub command: Command,
}

/// What to do.
#[derive(Debug, Subcommand)]
pub enum Command {
    /// Play a scenario and show what the fire does
    #[command(long_about = RUN_ABOUT, after_help = RUN_EXAMPLES)]
    Run(RunOptions),
    /// Read a scenario, show its faults or how it was understood; run nothing
    #[command(long_about = CHECK_ABOUT)]
    Check(CheckOptions),
    /// List fuels, linings, growth classes, door positions and gaps, with sources
    Catalogue(CatalogueOptions),
}

/// Options of `run`.
#[derive(Debug, Args)]
pub struct RunOptions {
    /// The scenario, a TOML file
    pub file: PathBuf,
    /// Play this tactic of the scenario
    #[arg(long, value_name = "NAME")]
    pub tactic: Option<String>,
    /// Folder for the results; when absent, named after the scenario, beside it
    #[arg(long, value_name = "DIR")]
    pub out: Option<PathBuf>,
    /// What standard output carries
    #[arg(long, value_enum, default_value_t = Format::Text)]
    pub format: Format,
    /// Time between two rows of the tables, with its unit
    #[arg(long, value_name = "TIME", default_value = "1 s", value_parser = output_interval)]
    pub every: f64,
    /// Show the run's own audit and every flag of its sub-models
    #[arg(long)]
    pub details: bool,
    /// Replace the results of an earlier run; other files in the folder stay
    #[arg(long)]
    pub replace: bool,
}

/// Options of `check`.
#[derive(Debug, Args)]
pub struct CheckOptions {
    /// The scenario, a TOML file
    pub file: PathBuf,
    /// Check it with this tactic
    #[arg(long, value_name = "NAME")]
    pub tactic: Option<String>,
    /// What standard output carries
    #[arg(long, value_enum, default_value_t = Format::Text)]
    pub format: Format,
}

/// Options of `catalogue`.
#[derive(Debug, Args)]
pub struct CatalogueOptions {
    /// What standard output carries
    #[arg(long, value_enum, default_value_t = Format::Text)]
    pub format: Format,
}

/// What standard output carries.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub enum Format {
    /// For people
    Text,
    /// One JSON document, SI
    Json,
}

/// Shortest and longest time between two rows, s: below, tables only grow;
/// above, no moment can be told.
const SHORTEST: f64 = 0.1;
const LONGEST: f64 = 60.0;

fn output_interval(text: &str) -> Result<f64, String> {
    if text.trim().parse::<f64>().is_ok() {
        return Err(format!("it needs a unit: \"{} s\"", text.trim()));
    }
    let seconds = units::read(text, units::Dimension::Time)
        .map_err(|error| format!("{error}; {}", error.help()))?;
    if (SHORTEST..=LONGEST).contains(&seconds) {
        Ok(seconds)
    } else {
        Err(format!("must lie between {SHORTEST} s and {LONGEST} s"))
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use clap::CommandFactory;

    #[test]
    fn cli_definitions_are_consistent() {
        Arguments::command().debug_assert();
    }

    #[test]
    fn cli_output_interval_has_a_unit_and_a_range() {
        assert_eq!(output_interval("0.5 s"), Ok(0.5));
        assert_eq!(output_interval("1 min"), Ok(60.0));
        for bad in ["1", "0 s", "-1 s", "2 h", "1 m", "", "nan s"] {
            assert!(output_interval(bad).is_err(), "{bad}");
        }
    }
}
