//! The one canvas of all plots: a drawing area in memory, eight times finer
//! than the picture, because the back end snaps to whole pixels.

use super::palette::Stroke;
use crate::show::files::PLOT_MARK;
use plotters::coord::Shift;
use plotters::drawing::DrawingArea;
use plotters::prelude::{IntoDrawingArea, PathElement, Rectangle, SVGBackend, Text};
use plotters::style::text_anchor::{HPos, Pos, VPos};
use plotters::style::{
    Color, FontDesc, FontFamily, FontStyle, IntoTextStyle, RGBColor, ShapeStyle,
};

/// Canvas units in one point of the picture.
const FINE: f64 = 8.0;

/// A drawing that could not be made.
#[derive(Debug, thiserror::Error)]
#[error("the plot {file} could not be drawn: {reason}")]
pub struct PlotError {
    /// Name of the file it was for.
    pub file: String,
    /// What the back end said.
    pub reason: String,
}

/// Where a text stands against its point.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Align {
    /// Begins there.
    Start,
    /// Centred there.
    Middle,
    /// Ends there.
    End,
}

/// Looks of a text.
#[derive(Debug, Clone, Copy)]
pub struct Writing {
    /// Font size in points of the picture.
    pub size: f64,
    /// Bold or not.
    pub bold: bool,
    /// Colour.
    pub colour: RGBColor,
    /// Against its point; vertically always centred.
    pub align: Align,
}

/// Looks of a line.
#[derive(Debug, Clone, Copy)]
pub struct Pen {
    /// Colour.
    pub colour: RGBColor,
    /// 0 (invisible) to 1.
    pub strength: f64,
    /// Width in points of the picture.
    pub width: f64,
    /// Stroke.
    pub stroke: Stroke,
}

/// The canvas; coordinates are points of the picture from its upper left.
pub struct Canvas<'a> {
    area: DrawingArea<SVGBackend<'a>, Shift>,
    failure: Option<String>,
}

/// Draws in memory and returns the finished SVG.
///
/// # Errors
/// When the back end refuses to draw.
pub fn draw_svg(
    file: &str,
    title: &str,
    (width, height): (f64, f64),
    draw: impl FnOnce(&mut Canvas<'_>),
) -> Result<Vec<u8>, PlotError> {
    let mut text = String::new();
    let size = (fine(width).unsigned_abs(), fine(height).unsigned_abs());
    let mut canvas = Canvas {
        area: SVGBackend::with_string(&mut text, size).into_drawing_area(),
        failure: None,
    };
    canvas.keep(|area| area.fill(&plotters::style::WHITE));
    draw(&mut canvas);
    canvas.keep(finished);
    if let Some(reason) = canvas.failure.take() {
        return Err(PlotError {
            file: file.to_owned(),
            reason,
        });
    }
    drop(canvas);
    Ok(with_head(&text, title, (width, height), size))
}

fn finished(area: &DrawingArea<SVGBackend<'_>, Shift>) -> Result<(), String> {
    area.present().map_err(|error| error.to_string())
}

/// Puts the picture's own size, a title for screen readers and our mark where
/// the back end wrote the size of the fine canvas.
fn with_head(text: &str, title: &str, (width, height): (f64, f64), size: (u32, u32)) -> Vec<u8> {
    let body = text.split_once('>').map_or(text, |(_, body)| body);
    let title = escaped(&printable(title));
    format!(
        "<svg width=\"{width}\" height=\"{height}\" viewBox=\"0 0 {} {}\" \
         xmlns=\"http://www.w3.org/2000/svg\" role=\"img\" stroke-linejoin=\"round\">\n\
         {PLOT_MARK}\n<title>{title}</title>{body}",
        size.0, size.1
    )
    .into_bytes()
}

impl Canvas<'_> {
    fn keep<E: std::fmt::Display>(
        &mut self,
        draw: impl FnOnce(&DrawingArea<SVGBackend<'_>, Shift>) -> Result<(), E>,
    ) {
        if self.failure.is_none() {
            self.failure = draw(&self.area).err().map(|error| error.to_string());
        }
    }

    /// A line through the points, broken into dashes where the pen says so.
    pub fn line(&mut self, points: &[(f64, f64)], pen: Pen) {
        match pen.stroke.pattern() {
            None => self.path(points, pen),
            Some(pattern) => {
                for dash in dashes(points, pattern) {
                    self.path(&dash, pen);
                }
            }
        }
    }

    fn path(&mut self, points: &[(f64, f64)], pen: Pen) {
        let mut path: Vec<(i32, i32)> = points.iter().map(|p| fine_point(*p)).collect();
        path.dedup();
        if path.len() < 2 {
            return;
        }
        let style = ShapeStyle {
            color: pen.colour.mix(pen.strength),
            filled: false,
            stroke_width: fine(pen.width).unsigned_abs(),
        };
        self.keep(|area| area.draw(&PathElement::new(path, style)));
    }

    /// A filled rectangle between two corners.
    pub fn rectangle(&mut self, from: (f64, f64), until: (f64, f64), colour: RGBColor) {
        let corners = [fine_point(from), fine_point(until)];
        self.keep(|area| area.draw(&Rectangle::new(corners, colour.filled())));
    }

    /// A text in the reader's own sans-serif font.
    pub fn write(&mut self, text: &str, at: (f64, f64), writing: Writing) {
        if text.is_empty() {
            return;
        }
        let style = if writing.bold {
            FontStyle::Bold
        } else {
            FontStyle::Normal
        };
        let position = match writing.align {
            Align::Start => HPos::Left,
            Align::Middle => HPos::Center,
            Align::End => HPos::Right,
        };
        // The back end divides the size by 1.24 on its way to the file.
        let font = FontDesc::new(FontFamily::SansSerif, writing.size * FINE * 1.24, style);
        let style = font
            .into_text_style(&self.area)
            .pos(Pos::new(position, VPos::Center))
            .color(&writing.colour);
        let text = printable(text);
        self.keep(|area| area.draw(&Text::new(text, fine_point(at), style)));
    }
}

/// Width of a text in points, on the generous side of common sans-serif fonts.
pub fn text_width(text: &str, size: f64) -> f64 {
    text.chars().count() as f64 * size * 0.6
}

/// The text cut to a width in points, with an ellipsis where it was cut.
pub fn fitted(text: &str, size: f64, width: f64) -> String {
    if text_width(text, size) <= width {
        return text.to_owned();
    }
    let mut kept = String::new();
    for character in text.chars() {
        kept.push(character);
        if text_width(&kept, size) + size > width {
            break;
        }
    }
    format!("{}…", kept.trim_end())
}

fn fine(points: f64) -> i32 {
    // Pictures are some thousand points wide; the clamp only tames nonsense.
    #[allow(clippy::cast_possible_truncation)]
    let whole = (points * FINE).round().clamp(-1e6, 1e6) as i32;
    whole
}

fn fine_point((x, y): (f64, f64)) -> (i32, i32) {
    (fine(x), fine(y))
}

fn dashes(points: &[(f64, f64)], (on, off): (f64, f64)) -> Vec<Vec<(f64, f64)>> {
    let mut all = Vec::new();
    let Some(first) = points.first() else {
        return all;
    };
    let (mut dash, mut drawing, mut left) = (vec![*first], true, on);
    let mut here = *first;
    for next in &points[1..] {
        let mut length = (next.0 - here.0).hypot(next.1 - here.1);
        while length > left {
            let share = left / length;
            here = (
                here.0 + (next.0 - here.0) * share,
                here.1 + (next.1 - here.1) * share,
            );
            length -= left;
            if drawing {
                dash.push(here);
                all.push(std::mem::take(&mut dash));
            } else {
                dash = vec![here];
            }
            drawing = !drawing;
            left = if drawing { on } else { off };
        }
        left -= length;
        here = *next;
        if drawing {
            dash.push(here);
        }
    }
    if drawing {
        all.push(dash);
    }
    all
}

/// Control characters are not allowed in XML, however they got into a name.
fn printable(text: &str) -> String {
    text.chars()
        .map(|c| if c.is_control() { ' ' } else { c })
        .filter(|c| !matches!(c, '\u{FFFE}' | '\u{FFFF}'))
        .collect()
}

fn escaped(text: &str) -> String {
    text.replace('&', "&amp;")
        .replace('<', "&lt;")
        .replace('>', "&gt;")
}

#[cfg(test)]
#[allow(clippy::unwrap_used)]
mod tests {
    use super::*;

    #[test]
    fn verify_dashes_cover_their_share() {
        let line: Vec<(f64, f64)> = (0..=100).map(|k| (f64::from(k), 0.0)).collect();
        let parts = dashes(&line, (7.0, 3.0));
        assert_eq!(parts.len(), 10);
        let drawn: f64 = parts.iter().map(|d| d[d.len() - 1].0 - d[0].0).sum();
        assert!((drawn - 70.0).abs() < 1e-9, "{drawn}");
    }

    #[test]
    fn verify_hostile_names_stay_well_formed() {
        let svg = draw_svg("x", "a <b> & \u{1}", (100.0, 50.0), |canvas| {
            canvas.write(
                "<&\u{7}>",
                (10.0, 10.0),
                Writing {
                    size: 12.0,
                    bold: false,
                    colour: super::super::palette::INK,
                    align: Align::Start,
                },
            );
        })
        .unwrap();
        let text = String::from_utf8(svg).unwrap();
        assert!(text.contains("a &lt;b&gt; &amp;"), "{text}");
        assert!(text.contains("&lt;& &gt;") || text.contains("&lt;&amp; &gt;"));
        assert!(text.contains("viewBox=\"0 0 800 400\""));
        assert!(text.trim_end().ends_with("</svg>"));
    }
}
