//! Conditions at each station, with the limits that the timeline watches.

use super::palette::{BLUE, GREEN, PURPLE, Stroke, VERMILION};
use super::picture::{Curve, Level, Panel, Picture};
use super::{blank, points};
use crate::plan::{Limits, Plan};
use crate::record::{Quantity, Record, Subject};
use crate::show::quantity::{table_number, unit};
use plotters::style::RGBColor;

/// One picture for every station that the record has.
pub fn pictures(record: &Record, plan: &Plan) -> Vec<Picture> {
    (0..plan.stations.len())
        .filter(|index| {
            let subject = Subject::Station(*index);
            !record.get(subject, Quantity::StationTemperature).is_empty()
        })
        .map(|index| picture(record, plan, index))
        .collect()
}

fn picture(record: &Record, plan: &Plan, index: usize) -> Picture {
    let station = &plan.stations[index];
    let mut picture = blank(
        record,
        plan,
        format!("station_{}", station.name),
        &format!(
            "Conditions at {}: {}, head at {:.1} m, {}",
            station.name, station.posture, station.height, plan.rooms[station.room.0].name
        ),
    );
    picture.panels = vec![
        temperature(record, index, &station.limits),
        visibility(record, index, &station.limits),
        oxygen(record, index, &station.limits),
        flux(record, index),
    ];
    picture
}

fn temperature(record: &Record, index: usize, limits: &Limits) -> Panel {
    let quantity = Quantity::StationTemperature;
    Panel {
        heading: "Gas temperature at head height [°C]".to_owned(),
        at_least: 100.0,
        levels: vec![
            level(quantity, limits.attention_temperature, "attention:"),
            level(quantity, limits.out_temperature, "training: be out,"),
        ],
        ..one_line(record, index, quantity, "temperature", VERMILION, 170.0)
    }
}

fn visibility(record: &Record, index: usize, limits: &Limits) -> Panel {
    let quantity = Quantity::StationVisibility;
    Panel {
        heading: "Visibility of a reflecting object [m]".to_owned(),
        at_least: 10.0,
        at_most: Some(10.0),
        levels: vec![level(quantity, limits.visibility, "limit:")],
        ..one_line(record, index, quantity, "visibility", BLUE, 110.0)
    }
}

fn oxygen(record: &Record, index: usize, limits: &Limits) -> Panel {
    let quantity = Quantity::StationOxygen;
    Panel {
        heading: "Oxygen [% by volume, dry]".to_owned(),
        at_least: 21.0,
        levels: vec![level(quantity, limits.oxygen, "limit:")],
        ..one_line(record, index, quantity, "oxygen", GREEN, 110.0)
    }
}

fn flux(record: &Record, index: usize) -> Panel {
    Panel {
        heading: "Radiant flux from the layer [kW/m2]".to_owned(),
        at_least: 2.0,
        ..one_line(record, index, Quantity::StationFlux, "flux", PURPLE, 110.0)
    }
}

fn level(quantity: Quantity, value: f64, what: &str) -> Level {
    let unit = unit(quantity.dimension());
    Level {
        value: unit.shown(value),
        label: format!("{what} {} {}", table_number(unit.shown(value)), unit.name),
    }
}

fn one_line(
    record: &Record,
    index: usize,
    quantity: Quantity,
    label: &str,
    colour: RGBColor,
    height: f64,
) -> Panel {
    Panel {
        height,
        curves: vec![Curve {
            label: label.to_owned(),
            points: points(record, Subject::Station(index), quantity),
            colour,
            stroke: Stroke::Solid,
            width: 2,
            strength: 1.0,
        }],
        ..Panel::default()
    }
}
