//! `doorglow run`.

use super::arguments::{Format, RunOptions};
use super::failure::{Done, Failure};
use super::folder::{Destination, destination};
use super::interrupt::Interrupt;
use super::pipeline::{self, Played, Read};
use super::progress::Progress;
use super::{faults, streams};
use crate::record::Ended;
use crate::show::quantity::clock;
use crate::show::text::Style;
use crate::show::{self, RunReading};
use serde_json::{json, to_value};

/// Plays a scenario, writes the files, shows the results.
///
/// # Errors
/// Faults in the scenario, a file that cannot be read or written.
pub fn run(options: &RunOptions) -> Result<Done, Failure> {
    let interrupt = Interrupt::listen();
    let tactic = options.tactic.as_deref();
    let read = pipeline::read(&options.file, tactic, options.format)?;
    faults::caution(&read.loaded.cautions);
    let out = options.out.as_deref();
    let destination = destination(&options.file, tactic, out, options.replace)?;
    let played = play(&read, options.every, &interrupt)?;
    // Files first: a reader of standard output may leave early.
    let written = write_files(&played, &read, &destination, options.replace);
    streams::write(&results(&played, &read, options)?)?;
    let done = told_end(&played, &read);
    streams::say(&written?);
    Ok(done)
}

fn play(read: &Read, every: f64, interrupt: &Interrupt) -> Result<Played, Failure> {
    let plan = &read.loaded.plan;
    let mut progress = Progress::new(plan.end);
    let played = pipeline::play(plan, every, &mut |time| {
        progress.reached(time);
        interrupt.is_asked()
    });
    progress.finish();
    played
}

/// Writes the files and gives the words to say about it.
fn write_files(
    played: &Played,
    read: &Read,
    destination: &Destination,
    replace: bool,
) -> Result<String, Failure> {
    match destination {
        Destination::Folder(folder) => {
            let files = pipeline::files(played, read)?;
            show::files::write_folder(folder, &files, replace)?;
            let count = files.len();
            Ok(format!("{count} files written to {}", folder.display()))
        }
        Destination::Taken(folder) => {
            let same = show::files::scenario_hash_in(folder).is_some_and(|hash| hash == read.hash);
            let of = if same { " of the same scenario" } else { "" };
            Ok(format!(
                "NOTHING WRITTEN: {} holds an EARLIER run{of} and was not changed; \
                 use --replace, or --out DIR for another folder.",
                folder.display()
            ))
        }
    }
}

fn results(played: &Played, read: &Read, options: &RunOptions) -> Result<String, Failure> {
    let (record, plan) = (&played.record, &read.loaded.plan);
    match options.format {
        Format::Text => {
            let style = Style {
                colour: streams::is_output_coloured(),
                width: streams::output_width(),
                details: options.details,
            };
            let (moments, summary) = (&played.moments, &played.summary);
            Ok(show::text::report(record, plan, moments, summary, &style))
        }
        Format::Json => {
            let reading = RunReading::new(record, plan, &played.moments, &played.summary);
            let mut document = to_value(reading).map_err(pipeline::unexpected)?;
            document["program"] = json!("doorglow");
            document["scenario_hash"] = json!(read.hash);
            Ok(format!("{document:#}\n"))
        }
    }
}

/// Says why a run ended before its time.
fn told_end(played: &Played, read: &Read) -> Done {
    let end = clock(read.loaded.plan.end);
    match &played.record.ended {
        Ended::Completed => Done::Fine,
        Ended::Interrupted(time) => {
            streams::say(&format!(
                "Stopped by you at {} of {end} simulated; the results reach to there.",
                clock(*time)
            ));
            Done::Stopped
        }
        Ended::Failed(time, reason) => {
            streams::say(&format!(
                "The run could not go on at {} of {end} simulated: {reason}\n\
                 The results reach to there.",
                clock(*time)
            ));
            Done::CouldNotGoOn
        }
    }
}
