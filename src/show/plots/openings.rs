//! Flows and neutral plane of each opening.

use super::palette::{BLUE, INK, Stroke, VERMILION};
use super::picture::{Curve, Level, Panel, Picture};
use super::{blank, largest, points};
use crate::plan::{Opening, OpeningKind, Plan, Space};
use crate::reading::spoken;
use crate::record::{Quantity, Record, Subject};
use crate::show::words::space_name;
use plotters::style::RGBColor;

/// One picture for every door and window that stands open at some time.
pub fn pictures(record: &Record, plan: &Plan) -> Vec<Picture> {
    (0..plan.openings.len())
        .filter(|index| plan.openings[*index].kind != OpeningKind::Gap)
        .filter(|index| largest(record, Subject::Opening(*index), Quantity::ClearWidth) > 0.0)
        .map(|index| picture(record, plan, index))
        .collect()
}

fn picture(record: &Record, plan: &Plan, index: usize) -> Picture {
    let subject = Subject::Opening(index);
    let opening = &plan.openings[index];
    let mut picture = blank(
        record,
        plan,
        format!("opening_{}", opening.name),
        &format!("Flow through {}", opening.name),
    );
    let (from, to) = (space_name(plan, opening.from), space_name(plan, opening.to));
    picture.panels = vec![
        Panel {
            heading: "Flow [kg/s]".to_owned(),
            note: String::new(),
            height: 220.0,
            at_least: 0.1,
            curves: vec![
                curve(
                    spoken(&format!("{from} to {to}")),
                    points(record, subject, Quantity::FlowForward),
                    VERMILION,
                    Stroke::Solid,
                ),
                curve(
                    spoken(&format!("{to} to {from}")),
                    points(record, subject, Quantity::FlowBackward),
                    BLUE,
                    Stroke::Dashed,
                ),
            ],
            ..Panel::default()
        },
        height_panel(record, plan, opening, subject),
    ];
    picture
}

fn height_panel(record: &Record, plan: &Plan, opening: &Opening, subject: Subject) -> Panel {
    let mut curves = Vec::new();
    for (side, colour) in [(opening.from, VERMILION), (opening.to, BLUE)] {
        if let Space::Room(room) = side {
            let offset = plan.rooms[room.0].floor_level - reference_level(plan, opening);
            let level = points(record, Subject::Room(room.0), Quantity::Interface)
                .into_iter()
                .map(|(time, value)| (time, value + offset))
                .collect();
            let mut smoke = curve(
                format!("smoke level, {}", spoken(&plan.rooms[room.0].name)),
                level,
                colour,
                Stroke::Dashed,
            );
            smoke.width = 1;
            curves.push(smoke);
        }
    }
    curves.push(curve(
        "neutral plane".to_owned(),
        neutral_plane(record, subject),
        INK,
        Stroke::Solid,
    ));
    let mut levels = vec![Level {
        value: opening.head,
        label: format!("head {:.2} m", opening.head),
    }];
    if opening.sill > 0.0 {
        levels.push(Level {
            value: opening.sill,
            label: format!("sill {:.2} m", opening.sill),
        });
    }
    Panel {
        heading: "Height above the floor [m]".to_owned(),
        note: "gaps in the line: flow goes one way, or the leaf is shut".to_owned(),
        height: 170.0,
        at_least: opening.head,
        curves,
        levels,
        ..Panel::default()
    }
}

/// The neutral plane while the opening stands open; the gap of a shut leaf has
/// none worth drawing.
fn neutral_plane(record: &Record, subject: Subject) -> Vec<(f64, f64)> {
    let mut plane = points(record, subject, Quantity::NeutralPlane);
    let clear = record.get(subject, Quantity::ClearWidth);
    for (point, clear) in plane.iter_mut().zip(clear) {
        if *clear <= 0.0 {
            point.1 = f64::NAN;
        }
    }
    plane
}

/// Floor of the room from which the heights of the opening count, m.
fn reference_level(plan: &Plan, opening: &Opening) -> f64 {
    match (opening.from, opening.to) {
        (Space::Room(room), _) | (Space::OpenAir, Space::Room(room)) => {
            plan.rooms[room.0].floor_level
        }
        (Space::OpenAir, Space::OpenAir) => 0.0,
    }
}

fn curve(label: String, points: Vec<(f64, f64)>, colour: RGBColor, stroke: Stroke) -> Curve {
    Curve {
        label,
        points,
        colour,
        stroke,
        width: 2,
        strength: 1.0,
    }
}
