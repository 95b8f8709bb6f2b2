//! Oxygen and unburned fuel.

use super::palette::{INK, Stroke};
use super::picture::{Curve, Panel, Picture};
use super::rooms::{ShownRoom, left_out, shown_rooms};
use super::{blank, points};
use crate::plan::Plan;
use crate::reading::spoken;
use crate::record::{Quantity, Record, Subject};
use plotters::style::RGBColor;

/// Rooms shown: more would hide the flame's base, which matters most.
const MOST_ROOMS: usize = 3;

/// Oxygen in the layers and at the flame's base, and unburned fuel.
pub fn picture(record: &Record, plan: &Plan) -> Picture {
    let mut picture = blank(
        record,
        plan,
        "oxygen_and_fuel".to_owned(),
        "Oxygen and unburned fuel",
    );
    let mut rooms = shown_rooms(record, plan);
    rooms.truncate(MOST_ROOMS);
    let mut oxygen = layers(
        record,
        &rooms,
        (Quantity::UpperOxygen, Quantity::LowerOxygen),
    );
    for index in 0..plan.items.len() {
        let subject = Subject::Item(index);
        oxygen.push(curve(
            format!("flame base, {}", spoken(record.name(subject))),
            points(record, subject, Quantity::BaseOxygen),
            INK,
            Stroke::Dotted,
            2,
        ));
    }
    picture.panels = vec![
        Panel {
            heading: "Oxygen [% by volume, water vapour included]".to_owned(),
            note: format!(
                "line: upper layer, dashes: lower layer{}",
                left_out(plan, &rooms)
            ),
            height: 240.0,
            at_least: 21.0,
            curves: oxygen,
            ..Panel::default()
        },
        Panel {
            heading: "Unburned fuel in the gas [% by mass]".to_owned(),
            note: "line: upper layer, dashes: lower layer".to_owned(),
            height: 160.0,
            at_least: 1.0,
            curves: layers(record, &rooms, (Quantity::UpperFuel, Quantity::LowerFuel)),
            ..Panel::default()
        },
    ];
    picture
}

fn layers(
    record: &Record,
    rooms: &[ShownRoom],
    (upper, lower): (Quantity, Quantity),
) -> Vec<Curve> {
    let mut curves = Vec::new();
    for room in rooms {
        let subject = Subject::Room(room.index);
        let lower = points(record, subject, lower);
        curves.push(curve(String::new(), lower, room.colour, Stroke::Dashed, 1));
    }
    for room in rooms {
        let subject = Subject::Room(room.index);
        let name = spoken(record.name(subject));
        let upper = points(record, subject, upper);
        curves.push(curve(name, upper, room.colour, Stroke::Solid, 2));
    }
    curves
}

fn curve(
    label: String,
    points: Vec<(f64, f64)>,
    colour: RGBColor,
    stroke: Stroke,
    width: u32,
) -> Curve {
    Curve {
        label,
        points,
        colour,
        stroke,
        width,
        strength: 1.0,
    }
}
