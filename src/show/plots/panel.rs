//! One panel: axes, grid, levels, curves and the labels at their ends.

use super::canvas::{Align, Canvas, Pen, Writing, fitted, text_width};
use super::labels::spread;
use super::palette::{AXIS, GRID, INK, LEADER, LEVEL, SHADE, SOFT_INK, Stroke};
use super::picture::{Curve, Mark, Panel, Picture};
use super::ticks::{TimeUnit, round_step, tick_text, ticks};
use plotters::style::WHITE;

/// Left edge of the axes, points.
pub const LEFT: f64 = 64.0;
/// Right edge of the axes, points.
pub const RIGHT: f64 = 768.0;
/// Width of the picture, points.
pub const WIDTH: f64 = 1000.0;
/// Room above the axes for the panel's heading, points.
pub const HEADING: f64 = 30.0;

const LABEL_SIZE: f64 = 12.0;
const TICK_SIZE: f64 = 11.0;
const LABEL_SPACING: f64 = 15.0;

/// The panel's place and scales.
pub struct Frame {
    top: f64,
    bottom: f64,
    end: f64,
    low: f64,
    high: f64,
    step: f64,
}

impl Frame {
    /// The frame of a panel whose heading begins at `top`.
    pub fn new(panel: &Panel, top: f64, end: f64) -> Self {
        let (low, high) = value_range(panel);
        let step = round_step(high - low, (panel.height / 25.0).min(8.0));
        Self {
            top: top + HEADING,
            bottom: top + HEADING + panel.height,
            end: end.max(f64::MIN_POSITIVE),
            low: (low / step + 1e-9).floor() * step,
            high: (high / step - 1e-9).ceil() * step,
            step,
        }
    }

    /// Lower edge of the axes, points.
    pub fn bottom(&self) -> f64 {
        self.bottom
    }

    fn y(&self, value: f64) -> f64 {
        let share = (value - self.low) / (self.high - self.low);
        self.bottom - share * (self.bottom - self.top)
    }
}

/// Horizontal place of a time on an axis that ends at `end`, points.
pub fn x_of(time: f64, end: f64) -> f64 {
    LEFT + time / end.max(f64::MIN_POSITIVE) * (RIGHT - LEFT)
}

/// Ticks of the time axis, s.
pub fn time_ticks(end: f64) -> (Vec<f64>, f64) {
    let unit = TimeUnit::for_end(end);
    let step = round_step(end / unit.seconds, 16.0) * unit.seconds;
    (ticks(0.0, end, step), step)
}

fn value_range(panel: &Panel) -> (f64, f64) {
    let values = panel
        .curves
        .iter()
        .flat_map(|curve| curve.points.iter().map(|point| point.1))
        .chain(panel.levels.iter().map(|level| level.value))
        .filter(|value| value.is_finite());
    let (mut low, mut high) = (0.0_f64, panel.at_least.max(f64::MIN_POSITIVE));
    for value in values {
        low = low.min(value);
        high = high.max(value);
    }
    if let Some(most) = panel.at_most {
        high = high.min(most);
    }
    (low, high.max(low + 1e-9))
}

/// Draws everything of the panel.
pub fn draw_panel(canvas: &mut Canvas<'_>, picture: &Picture, panel: &Panel, frame: &Frame) {
    draw_shades(canvas, panel, frame);
    draw_grid(canvas, frame);
    draw_marks(canvas, &picture.marks, frame);
    draw_levels(canvas, panel, frame);
    for curve in &panel.curves {
        for piece in pieces(&curve.points, frame) {
            canvas.line(&piece, curve_pen(curve));
        }
    }
    draw_axes(canvas, frame);
    draw_heading(canvas, panel, frame);
    draw_labels(canvas, panel, frame);
}

fn thin(colour: plotters::style::RGBColor) -> Pen {
    Pen {
        colour,
        strength: 1.0,
        width: 1.0,
        stroke: Stroke::Solid,
    }
}

fn draw_shades(canvas: &mut Canvas<'_>, panel: &Panel, frame: &Frame) {
    for shade in &panel.shades {
        let from = x_of(shade.from.clamp(0.0, frame.end), frame.end);
        let until = x_of(shade.until.clamp(0.0, frame.end), frame.end);
        canvas.rectangle((from, frame.top), (until, frame.bottom), SHADE);
        if text_width(&shade.label, TICK_SIZE) + 8.0 < until - from {
            let at = (f64::midpoint(from, until), frame.top + 10.0);
            canvas.write(
                &shade.label,
                at,
                writing(TICK_SIZE, SOFT_INK, Align::Middle),
            );
        }
    }
}

fn draw_grid(canvas: &mut Canvas<'_>, frame: &Frame) {
    for tick in time_ticks(frame.end).0 {
        let x = x_of(tick, frame.end);
        canvas.line(&[(x, frame.top), (x, frame.bottom)], thin(GRID));
    }
    for tick in ticks(frame.low, frame.high, frame.step) {
        let y = frame.y(tick);
        canvas.line(&[(LEFT, y), (RIGHT, y)], thin(GRID));
        let text = tick_text(tick, frame.step);
        canvas.write(
            &text,
            (LEFT - 8.0, y),
            writing(TICK_SIZE, SOFT_INK, Align::End),
        );
    }
}

fn draw_marks(canvas: &mut Canvas<'_>, marks: &[Mark], frame: &Frame) {
    for mark in marks {
        let x = x_of(mark.time, frame.end);
        let top = frame.top - HEADING - 8.0;
        canvas.line(&[(x, top), (x, frame.bottom)], thin(AXIS));
    }
}

fn draw_levels(canvas: &mut Canvas<'_>, panel: &Panel, frame: &Frame) {
    for level in shown_levels(panel, frame) {
        let y = frame.y(level.value);
        canvas.line(&[(LEFT, y), (RIGHT, y)], level_pen());
    }
}

fn shown_levels<'a>(
    panel: &'a Panel,
    frame: &'a Frame,
) -> impl Iterator<Item = &'a super::picture::Level> {
    panel
        .levels
        .iter()
        .filter(|level| (frame.low..=frame.high).contains(&level.value))
}

fn level_pen() -> Pen {
    Pen {
        colour: LEVEL,
        strength: 1.0,
        width: 1.0,
        stroke: Stroke::Dotted,
    }
}

fn draw_axes(canvas: &mut Canvas<'_>, frame: &Frame) {
    let corner = (LEFT, frame.bottom);
    canvas.line(
        &[(LEFT, frame.top), corner, (RIGHT, frame.bottom)],
        thin(AXIS),
    );
}

fn draw_heading(canvas: &mut Canvas<'_>, panel: &Panel, frame: &Frame) {
    let y = frame.top - 13.0;
    let heading = Writing {
        bold: true,
        ..writing(13.0, INK, Align::Start)
    };
    // White behind the words, where the line of an action would cross them.
    let width = text_width(&panel.heading, 14.0);
    canvas.rectangle((LEFT, y - 9.0), (LEFT + width, y + 9.0), WHITE);
    canvas.write(&panel.heading, (LEFT, y), heading);
    let mut note = panel.note.clone();
    let beyond = panel.curves.iter().filter(|curve| goes_above(curve, frame));
    let beyond: Vec<&str> = beyond.map(|curve| curve.label.as_str()).collect();
    if !beyond.is_empty() {
        if !note.is_empty() {
            note.push_str("; ");
        }
        let names = beyond.join(", ");
        note = format!("{note}↑ leaves the axis: {names}");
    }
    let width = text_width(&note, TICK_SIZE);
    if width > 0.0 {
        canvas.rectangle((RIGHT - 4.0 - width, y - 8.0), (RIGHT, y + 8.0), WHITE);
    }
    let looks = writing(TICK_SIZE, SOFT_INK, Align::End);
    canvas.write(&note, (RIGHT - 4.0, y), looks);
}

fn draw_labels(canvas: &mut Canvas<'_>, panel: &Panel, frame: &Frame) {
    let mut ends: Vec<(f64, String, Pen)> = panel
        .curves
        .iter()
        .filter_map(|curve| curve_end(curve, frame))
        .collect();
    ends.extend(
        shown_levels(panel, frame)
            .map(|level| (frame.y(level.value), level.label.clone(), level_pen())),
    );
    let wished: Vec<f64> = ends.iter().map(|end| end.0).collect();
    let placed = spread(&wished, LABEL_SPACING, frame.top + 4.0, frame.bottom - 4.0);
    for ((wish, label, pen), y) in ends.into_iter().zip(placed) {
        let (near, far) = (RIGHT + 3.0, RIGHT + 16.0);
        canvas.line(&[(near, wish), (far, y)], thin(LEADER));
        canvas.line(&[(far, y), (far + 21.0, y)], pen);
        let text = fitted(&label, LABEL_SIZE, WIDTH - far - 32.0);
        canvas.write(
            &text,
            (far + 27.0, y),
            writing(LABEL_SIZE, INK, Align::Start),
        );
    }
}

/// Height, words and pen of the label at the end of a curve.
fn curve_end(curve: &Curve, frame: &Frame) -> Option<(f64, String, Pen)> {
    if curve.label.is_empty() {
        return None;
    }
    let last = pieces(&curve.points, frame).pop()?.pop()?;
    let label = if ends_above(curve, frame) {
        format!("{} ↑", curve.label)
    } else {
        curve.label.clone()
    };
    Some((last.1, label, curve_pen(curve)))
}

/// True when the curve leaves the axes through the top at some time.
fn goes_above(curve: &Curve, frame: &Frame) -> bool {
    curve.points.iter().any(|point| point.1 > frame.high)
}

/// True when the curve has left the axes through the top and not come back.
fn ends_above(curve: &Curve, frame: &Frame) -> bool {
    let mut values = curve.points.iter().rev().map(|point| point.1);
    values
        .find(|value| value.is_finite())
        .is_some_and(|value| value > frame.high)
}

fn curve_pen(curve: &Curve) -> Pen {
    Pen {
        colour: curve.colour,
        strength: curve.strength,
        width: f64::from(curve.width),
        stroke: curve.stroke,
    }
}

/// Looks of an ordinary text.
pub fn writing(size: f64, colour: plotters::style::RGBColor, align: Align) -> Writing {
    Writing {
        size,
        bold: false,
        colour,
        align,
    }
}

/// The curve as unbroken pieces on the canvas: cut where there is no value and
/// where it leaves the axes, thinned to what the eye can tell apart.
fn pieces(points: &[(f64, f64)], frame: &Frame) -> Vec<Vec<(f64, f64)>> {
    let mut all: Vec<Vec<(f64, f64)>> = Vec::new();
    let mut open = false;
    for (time, value) in points {
        let inside = value.is_finite()
            && (0.0..=frame.end).contains(time)
            && (frame.low..=frame.high).contains(value);
        if !inside {
            open = false;
            continue;
        }
        let here = (x_of(*time, frame.end), frame.y(*value));
        match all.last_mut() {
            Some(piece) if open => piece.push(here),
            _ => all.push(vec![here]),
        }
        open = true;
    }
    all.iter().map(|piece| thinned(piece)).collect()
}

fn thinned(piece: &[(f64, f64)]) -> Vec<(f64, f64)> {
    const FAR: f64 = 0.4;
    let mut kept: Vec<(f64, f64)> = Vec::new();
    for (index, point) in piece.iter().enumerate() {
        let is_end = index + 1 == piece.len();
        let is_far = kept
            .last()
            .is_none_or(|last| (point.0 - last.0).hypot(point.1 - last.1) > FAR);
        if is_end || is_far {
            kept.push(*point);
        }
    }
    kept
}
