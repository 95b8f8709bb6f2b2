//! The timeline as a table: time from ignition, time since the last action,
//! what happens with the numbers behind it.

use super::lines::{Page, clean, glued, wrap};
use super::values;
use crate::reading::{BAND_SOURCE, Kind, Moment, Weight};

/// Columns before the words: time, gap, since, gap.
const INDENT: usize = 17;

/// From this width on the numbers stand beside the words.
const WIDE: usize = 110;

/// Writes the timeline.
pub(super) fn write(page: &mut Page, moments: &[Moment], details: bool) {
    page.heading("TIMELINE");
    if moments.is_empty() {
        page.paragraph("Nothing happened that the timeline watches.");
        return;
    }
    page.paragraph("Minutes from ignition; in the second column, from the last action.");
    page.gap();
    let hidden = |moment: &Moment| moment.weight == Weight::Detail && !details;
    let mut before: Option<&Moment> = None;
    for moment in moments.iter().filter(|moment| !hidden(moment)) {
        let opens_stage =
            moment.kind == Kind::Action && before.is_some_and(|before| before.time < moment.time);
        if opens_stage {
            page.gap();
        }
        row(page, moment);
        before = Some(moment);
    }
    if moments.iter().any(|moment| moment.band.is_some()) {
        page.gap();
        page.paragraph(BAND_SOURCE);
    }
}

/// One moment.
fn row(page: &mut Page, moment: &Moment) {
    let since = moment
        .since_action
        .as_ref()
        .map_or_else(String::new, |since| values::since(since.seconds));
    let head = format!("{:>6}  {since:>7}  ", values::clock(moment.time));
    let room = page.width.saturating_sub(INDENT).max(20);
    let wide = page.width >= WIDE;
    let words_width = if wide { room / 2 } else { room };
    let words = wrap(&clean(&moment.text), words_width);
    let numbers_width = if wide {
        room - words_width - 2
    } else {
        room.saturating_sub(2).max(18)
    };
    let behind = behind(moment);
    let numbers = if behind.is_empty() {
        Vec::new()
    } else {
        wrap(&behind, numbers_width)
    };
    let strong = moment.weight == Weight::Headline;
    let pen = page.pen;
    let emphasised = |text: &str| {
        if strong {
            pen.strong(text)
        } else {
            text.to_owned()
        }
    };
    if wide {
        for line in 0..words.len().max(numbers.len()) {
            let left = if line == 0 { head.as_str() } else { "" };
            let word = words.get(line).map_or("", String::as_str);
            let number = numbers.get(line).map_or("", String::as_str);
            let padding = " ".repeat((words_width + 2).saturating_sub(word.chars().count()));
            let word = emphasised(word);
            let number = pen.faint(number);
            page.line(&format!("{left:INDENT$}{word}{padding}{number}"));
        }
    } else {
        for (line, word) in words.iter().enumerate() {
            let left = if line == 0 { head.as_str() } else { "" };
            let word = emphasised(word);
            page.line(&format!("{left:INDENT$}{word}"));
        }
        for number in &numbers {
            let number = pen.faint(number);
            page.line(&format!("{:INDENT$}  {number}", ""));
        }
    }
}

/// Band and numbers of a moment in words.
fn behind(moment: &Moment) -> String {
    let mut parts: Vec<String> = moment
        .numbers
        .iter()
        .map(|number| {
            let value = values::value(number.value, number.dimension);
            format!("{} {}", number.label, glued(&value))
        })
        .collect();
    parts.extend(band(moment));
    parts.join(", ")
}

/// The band on the clock of the last action, so that it compares with the
/// second column.
fn band(moment: &Moment) -> Option<String> {
    let band = moment.band?;
    let text = if let Some(since) = &moment.since_action {
        let action = moment.time - since.seconds;
        let earliest = values::since((band.earliest - action).max(0.0));
        let latest = values::since(band.latest - action);
        glued(&format!("band {earliest} to {latest}"))
    } else {
        let earliest = values::clock(band.earliest);
        let latest = values::clock(band.latest);
        glued(&format!("band {earliest} to {latest}"))
    };
    Some(text)
}
