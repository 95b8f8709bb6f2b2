//! What a picture shows, before it is drawn: plain data in shown units.

use super::palette::Stroke;
use plotters::style::RGBColor;

/// One file: panels above each other that share the time axis.
#[derive(Debug, Clone)]
pub struct Picture {
    /// File name without ending.
    pub file: String,
    /// What it shows.
    pub title: String,
    /// Scenario and tactic.
    pub subtitle: String,
    /// End of the time axis, s.
    pub end: f64,
    /// Changes on the way.
    pub marks: Vec<Mark>,
    /// From top to bottom.
    pub panels: Vec<Panel>,
}

/// A change at a time, drawn through all panels.
#[derive(Debug, Clone, PartialEq)]
pub struct Mark {
    /// s from ignition.
    pub time: f64,
    /// What was done.
    pub label: String,
}

/// One pair of axes.
#[derive(Debug, Clone, Default)]
pub struct Panel {
    /// What and in which unit.
    pub heading: String,
    /// How to read the strokes, in a few words.
    pub note: String,
    /// Height in points of the picture.
    pub height: f64,
    /// The least that the axis must reach up to, shown unit.
    pub at_least: f64,
    /// The axis never reaches above this, shown unit.
    pub at_most: Option<f64>,
    /// Lines.
    pub curves: Vec<Curve>,
    /// Limits and heights.
    pub levels: Vec<Level>,
    /// Time spans picked out.
    pub shades: Vec<Shade>,
}

/// One line.
#[derive(Debug, Clone)]
pub struct Curve {
    /// Label at the end of the line; none when empty.
    pub label: String,
    /// Time (s) and value (shown unit); not-a-number breaks the line.
    pub points: Vec<(f64, f64)>,
    /// Colour.
    pub colour: RGBColor,
    /// Stroke.
    pub stroke: Stroke,
    /// Width in points of the picture.
    pub width: u32,
    /// 0 (invisible) to 1.
    pub strength: f64,
}

/// A value that curves are read against.
#[derive(Debug, Clone, PartialEq)]
pub struct Level {
    /// Shown unit.
    pub value: f64,
    /// Label at the right.
    pub label: String,
}

/// A time span picked out.
#[derive(Debug, Clone, PartialEq)]
pub struct Shade {
    /// s from ignition.
    pub from: f64,
    /// s from ignition.
    pub until: f64,
    /// Written at its top where it fits.
    pub label: String,
}
