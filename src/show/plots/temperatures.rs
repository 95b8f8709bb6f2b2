//! Layer temperatures and smoke level.

use super::palette::Stroke;
use super::picture::{Curve, Level, Panel, Picture};
use super::rooms::{ShownRoom, left_out, shown_rooms};
use super::{blank, points};
use crate::plan::Plan;
use crate::reading::{self, spoken};
use crate::record::{Quantity, Record, Subject};

/// Strength of the smoke level while the smoke reaches to the floor and the
/// level says little.
const FAINT: f64 = 0.45;

/// Layer temperatures and smoke level of the rooms that matter.
pub fn picture(record: &Record, plan: &Plan) -> Picture {
    let mut picture = blank(
        record,
        plan,
        "temperatures".to_owned(),
        "Layer temperatures and smoke level",
    );
    let rooms = shown_rooms(record, plan);
    picture.panels = vec![
        temperature_panel(record, plan, &rooms),
        smoke_panel(record, plan, &rooms),
    ];
    picture
}

fn temperature_panel(record: &Record, plan: &Plan, rooms: &[ShownRoom]) -> Panel {
    let mut curves = Vec::new();
    for room in rooms {
        let subject = Subject::Room(room.index);
        curves.push(Curve {
            label: String::new(),
            points: points(record, subject, Quantity::LowerTemperature),
            colour: room.colour,
            stroke: Stroke::Dashed,
            width: 1,
            strength: 0.9,
        });
    }
    for room in rooms {
        let subject = Subject::Room(room.index);
        curves.push(Curve {
            label: spoken(record.name(subject)),
            points: points(record, subject, Quantity::UpperTemperature),
            colour: room.colour,
            stroke: Stroke::Solid,
            width: 2,
            strength: 1.0,
        });
    }
    Panel {
        heading: "Gas temperature [°C]".to_owned(),
        note: format!(
            "line: upper layer, dashes: lower layer{}",
            left_out(plan, rooms)
        ),
        height: 260.0,
        at_least: 100.0,
        curves,
        ..Panel::default()
    }
}

fn smoke_panel(record: &Record, plan: &Plan, rooms: &[ShownRoom]) -> Panel {
    let summary = reading::summary(record, plan);
    let mut curves = Vec::new();
    let mut to_floor = false;
    for room in rooms {
        let subject = Subject::Room(room.index);
        let stretches = summary
            .rooms
            .get(room.index)
            .map_or(&[][..], |room| &room.smoke_to_floor);
        let smoky = |time: f64| {
            stretches
                .iter()
                .any(|stretch| time >= stretch.from && stretch.to.is_none_or(|to| time <= to))
        };
        let level = points(record, subject, Quantity::Interface);
        let part = |wanted: bool| {
            let keep = |(time, value): (f64, f64)| {
                let value = if smoky(time) == wanted {
                    value
                } else {
                    f64::NAN
                };
                (time, value)
            };
            level.iter().copied().map(keep).collect::<Vec<_>>()
        };
        to_floor |= !stretches.is_empty();
        if !stretches.is_empty() {
            curves.push(Curve {
                label: String::new(),
                points: part(true),
                colour: room.colour,
                stroke: Stroke::Dotted,
                width: 2,
                strength: FAINT,
            });
        }
        curves.push(Curve {
            label: spoken(record.name(subject)),
            points: part(false),
            colour: room.colour,
            stroke: Stroke::Solid,
            width: 2,
            strength: 1.0,
        });
    }
    let ceiling = rooms
        .iter()
        .map(|room| plan.rooms[room.index].height)
        .fold(0.0, f64::max);
    Panel {
        heading: "Smoke level above the floor [m]".to_owned(),
        note: if to_floor {
            "dots: head heights; faint dots: smoke to the floor".to_owned()
        } else {
            "dots: head heights".to_owned()
        },
        height: 150.0,
        at_least: ceiling,
        curves,
        levels: head_heights(plan),
        ..Panel::default()
    }
}

/// Heights of heads at the stations; the usual two where there is no station
/// (1.0 m kneeling, 1.7 m standing, common practice).
fn head_heights(plan: &Plan) -> Vec<Level> {
    let mut levels: Vec<Level> = Vec::new();
    for station in &plan.stations {
        let label = format!("{} {:.1} m", station.posture, station.height);
        if levels.iter().all(|level| level.label != label) {
            levels.push(Level {
                value: station.height,
                label,
            });
        }
    }
    if levels.is_empty() {
        levels = vec![
            Level {
                value: 1.0,
                label: "kneeling 1.0 m".to_owned(),
            },
            Level {
                value: 1.7,
                label: "standing 1.7 m".to_owned(),
            },
        ];
    }
    levels
}
