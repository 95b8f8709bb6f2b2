//! Heat release: what is given off, what burns, what the air would carry.

use super::palette::{BLUE, INK, Stroke, VERMILION};
use super::picture::{Curve, Panel, Picture, Shade};
use super::{blank, points};
use crate::plan::Plan;
use crate::reading;
use crate::record::{Quantity, Record, Subject};

/// Heat release with the times short of air.
pub fn picture(record: &Record, plan: &Plan) -> Picture {
    let mut picture = blank(record, plan, "heat_release".to_owned(), "Heat release");
    let burned = curve(record, Quantity::Burned);
    let air = curve(record, Quantity::AirCouldBurn);
    let peak = |points: &[(f64, f64)]| {
        points
            .iter()
            .map(|point| point.1)
            .filter(|value| value.is_finite())
            .fold(0.0, f64::max)
    };
    let given_off = curve(record, Quantity::GivenOff);
    picture.panels = vec![Panel {
        heading: "Heat release [kW]".to_owned(),
        note: "shaded: short of air".to_owned(),
        height: 380.0,
        at_least: 100.0,
        // The air line may tower over the fire; it is cut where it says no more.
        at_most: Some((1.25 * peak(&burned).max(peak(&given_off))).max(100.0)),
        curves: vec![
            line("incoming air could burn", air, BLUE, Stroke::Dashed, 2),
            line("burned", burned, VERMILION, Stroke::Solid, 3),
            // On top: it lies on the line of what burns while there is air enough.
            line("given off as fuel", given_off, INK, Stroke::Dotted, 2),
        ],
        shades: short_of_air(record, plan),
        ..Panel::default()
    }];
    picture
}

fn curve(record: &Record, quantity: Quantity) -> Vec<(f64, f64)> {
    points(record, Subject::House, quantity)
}

fn line(
    label: &str,
    points: Vec<(f64, f64)>,
    colour: plotters::style::RGBColor,
    stroke: Stroke,
    width: u32,
) -> Curve {
    Curve {
        label: label.to_owned(),
        points,
        colour,
        stroke,
        width,
        strength: 1.0,
    }
}

/// Spans short of air, by the rule of [`crate::reading`].
fn short_of_air(record: &Record, plan: &Plan) -> Vec<Shade> {
    let end = record.time.last().copied().unwrap_or(0.0);
    reading::summary(record, plan)
        .short_of_air
        .into_iter()
        .map(|stretch| Shade {
            from: stretch.from,
            until: stretch.to.unwrap_or(end),
            label: "short of air".to_owned(),
        })
        .collect()
}
