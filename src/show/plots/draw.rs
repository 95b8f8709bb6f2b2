//! A picture on the canvas: title, marks of actions, panels, both time scales
//! and the caution.

use super::canvas::{Align, Canvas, Pen, PlotError, Writing, draw_svg, fitted, text_width};
use super::labels::rows;
use super::palette::{AXIS, INK, SOFT_INK, Stroke};
use super::panel::{Frame, HEADING, LEFT, RIGHT, WIDTH, draw_panel, time_ticks, writing, x_of};
use super::picture::Picture;
use super::ticks::{TimeUnit, tick_text};
use crate::show::quantity::clock;
use crate::show::{CAUTION, PROGRAM_VERSION};

const HEAD: f64 = 56.0;
const MARK_ROW: f64 = 15.0;
const MARK_SIZE: f64 = 11.0;
/// More rows of marks than this would push the panels off the page.
const MOST_MARK_ROWS: usize = 6;
const PANEL_GAP: f64 = 8.0;

/// The picture as SVG.
///
/// # Errors
/// When the back end refuses to draw.
pub fn draw_picture(picture: &Picture) -> Result<Vec<u8>, PlotError> {
    let marks = place_marks(picture);
    let mark_rows = marks.iter().map(|mark| mark.row + 1).max().unwrap_or(0);
    let top = HEAD + mark_rows as f64 * MARK_ROW;
    let panels: f64 = picture
        .panels
        .iter()
        .map(|panel| HEADING + panel.height + PANEL_GAP)
        .sum();
    let scales = if picture.marks.is_empty() { 28.0 } else { 46.0 };
    let height = top + panels + scales + 30.0;
    draw_svg(
        &picture.file,
        &picture.title,
        (WIDTH, height.ceil()),
        |canvas| {
            draw_title(canvas, picture);
            draw_mark_lines(canvas, &marks, top);
            let mut from = top;
            for panel in &picture.panels {
                let frame = Frame::new(panel, from, picture.end);
                draw_panel(canvas, picture, panel, &frame);
                from = frame.bottom() + PANEL_GAP;
            }
            draw_time_scales(canvas, picture, from - PANEL_GAP);
            draw_foot(canvas, height.ceil());
        },
    )
}

struct PlacedMark {
    x: f64,
    row: usize,
    text: String,
}

fn place_marks(picture: &Picture) -> Vec<PlacedMark> {
    let texts: Vec<(f64, String)> = picture
        .marks
        .iter()
        .map(|mark| {
            let x = x_of(mark.time, picture.end);
            let text = format!("{} {}", clock(mark.time), mark.label);
            let room = (WIDTH - x - 16.0).min(300.0);
            (x, fitted(&text, MARK_SIZE, room))
        })
        .collect();
    let starts: Vec<f64> = texts.iter().map(|(x, _)| *x).collect();
    let widths: Vec<f64> = texts
        .iter()
        .map(|(_, text)| text_width(text, MARK_SIZE) + 4.0)
        .collect();
    rows(&starts, &widths, 4.0)
        .into_iter()
        .zip(texts)
        .filter(|(row, _)| *row < MOST_MARK_ROWS)
        .map(|(row, (x, text))| PlacedMark { x, row, text })
        .collect()
}

fn draw_title(canvas: &mut Canvas<'_>, picture: &Picture) {
    let title = Writing {
        bold: true,
        ..writing(17.0, INK, Align::Start)
    };
    canvas.write(&picture.title, (16.0, 22.0), title);
    let subtitle = fitted(&picture.subtitle, 12.0, WIDTH - 32.0);
    canvas.write(
        &subtitle,
        (16.0, 42.0),
        writing(12.0, SOFT_INK, Align::Start),
    );
}

fn draw_mark_lines(canvas: &mut Canvas<'_>, marks: &[PlacedMark], top: f64) {
    for mark in marks {
        let y = HEAD + (mark.row as f64 + 0.5) * MARK_ROW;
        let pen = Pen {
            colour: AXIS,
            strength: 1.0,
            width: 1.0,
            stroke: Stroke::Solid,
        };
        canvas.line(&[(mark.x, y - 6.0), (mark.x, top)], pen);
        let at = (mark.x + 4.0, y);
        canvas.write(&mark.text, at, writing(MARK_SIZE, INK, Align::Start));
    }
}

fn draw_time_scales(canvas: &mut Canvas<'_>, picture: &Picture, bottom: f64) {
    let unit = TimeUnit::for_end(picture.end);
    let (ticks, step) = time_ticks(picture.end);
    let label = writing(11.0, SOFT_INK, Align::Middle);
    let y = bottom + 13.0;
    for tick in &ticks {
        let text = tick_text(tick / unit.seconds, step / unit.seconds);
        canvas.write(&text, (x_of(*tick, picture.end), y), label);
    }
    let name = writing(11.0, SOFT_INK, Align::Start);
    let beside = RIGHT + 19.0;
    canvas.write(&format!("{} from ignition", unit.name), (beside, y), name);
    if !picture.marks.is_empty() {
        draw_scale_since(canvas, picture, (unit, step), bottom + 31.0);
        let text = format!("{} since the last action", unit.name);
        canvas.write(&text, (beside, bottom + 31.0), name);
    }
}

/// Times since the last action: people say "two minutes after the door".
fn draw_scale_since(
    canvas: &mut Canvas<'_>,
    picture: &Picture,
    (unit, step): (TimeUnit, f64),
    y: f64,
) {
    let mut last_x = LEFT - 100.0;
    for (index, mark) in picture.marks.iter().enumerate() {
        let until = picture
            .marks
            .get(index + 1)
            .map_or(picture.end, |next| next.time);
        for count in 0..60 {
            let since = f64::from(count) * step;
            let x = x_of(mark.time + since, picture.end);
            if mark.time + since > until + 1e-6 {
                break;
            }
            let is_next_action =
                count > 0 && index + 1 < picture.marks.len() && x + 14.0 > x_of(until, picture.end);
            if x - last_x < 22.0 || is_next_action {
                continue;
            }
            let text = if count == 0 {
                "0".to_owned()
            } else {
                format!("+{}", tick_text(since / unit.seconds, step / unit.seconds))
            };
            canvas.write(&text, (x, y), writing(11.0, SOFT_INK, Align::Middle));
            last_x = x;
        }
    }
}

fn draw_foot(canvas: &mut Canvas<'_>, height: f64) {
    let y = height - 14.0;
    canvas.write(CAUTION, (16.0, y), writing(11.0, INK, Align::Start));
    let version = format!("doorglow {PROGRAM_VERSION}");
    canvas.write(
        &version,
        (WIDTH - 16.0, y),
        writing(11.0, SOFT_INK, Align::End),
    );
}
