//! Plots of a record as SVG: no system library, no fonts, the same bytes for
//! the same record.

mod canvas;
mod draw;
mod gases;
mod labels;
mod openings;
mod palette;
mod panel;
mod picture;
mod release;
mod rooms;
mod stations;
mod temperatures;
mod ticks;

pub use canvas::PlotError;

use super::files::file_word;
use super::quantity::unit;
use crate::plan::Plan;
use crate::reading::spoken;
use crate::record::{Quantity, Record, Subject};
use picture::{Mark, Picture};

/// All plots of a run: file name and bytes. Layer temperatures and smoke
/// level, heat release, oxygen and unburned fuel, one for every opening that
/// stands open at some time, one for every station.
///
/// # Errors
/// When a drawing could not be made; nothing touches the disk.
pub fn all(record: &Record, plan: &Plan) -> Result<Vec<(String, Vec<u8>)>, PlotError> {
    let mut pictures = vec![
        temperatures::picture(record, plan),
        release::picture(record, plan),
        gases::picture(record, plan),
    ];
    pictures.extend(openings::pictures(record, plan));
    pictures.extend(stations::pictures(record, plan));
    let mut files: Vec<(String, Vec<u8>)> = Vec::with_capacity(pictures.len());
    for picture in pictures {
        let name = free_name(&files, &picture.file);
        files.push((name, draw::draw_picture(&picture)?));
    }
    Ok(files)
}

/// Two names may become one when they are made fit for a file. The comparison
/// ignores case, as some file systems do.
fn free_name(taken: &[(String, Vec<u8>)], wanted: &str) -> String {
    let wanted = file_word(wanted);
    let mut name = format!("{wanted}.svg");
    let mut count = 2;
    while taken
        .iter()
        .any(|(other, _)| other.to_lowercase() == name.to_lowercase())
    {
        name = format!("{wanted}_{count}.svg");
        count += 1;
    }
    name
}

/// A picture with everything but its panels.
fn blank(record: &Record, plan: &Plan, file: String, title: &str) -> Picture {
    let end = record.time.last().copied().unwrap_or(plan.end);
    let tactic = plan.tactic.as_ref().map_or_else(String::new, |tactic| {
        format!(" · tactic: {}", spoken(tactic))
    });
    Picture {
        file,
        title: spoken(title),
        subtitle: format!("{}{tactic}", plan.title),
        end: if end > 0.0 { end } else { plan.end },
        marks: marks(plan, end),
        panels: Vec::new(),
    }
}

fn marks(plan: &Plan, end: f64) -> Vec<Mark> {
    let mut marks: Vec<Mark> = Vec::new();
    for action in plan.actions.iter().filter(|action| action.time <= end) {
        match marks.last_mut() {
            Some(last) if (action.time - last.time).abs() < 0.5 => {
                last.label = format!("{}, {}", last.label, spoken(&action.name));
            }
            _ => marks.push(Mark {
                time: action.time,
                label: spoken(&action.name),
            }),
        }
    }
    marks
}

/// One history in shown units, against time in seconds.
fn points(record: &Record, subject: Subject, quantity: Quantity) -> Vec<(f64, f64)> {
    let unit = unit(quantity.dimension());
    record
        .time
        .iter()
        .zip(record.get(subject, quantity))
        .map(|(time, value)| (*time, unit.shown(*value)))
        .collect()
}

/// Largest finite value of a history, SI.
fn largest(record: &Record, subject: Subject, quantity: Quantity) -> f64 {
    record
        .get(subject, quantity)
        .iter()
        .copied()
        .filter(|value| value.is_finite())
        .fold(f64::NEG_INFINITY, f64::max)
}
