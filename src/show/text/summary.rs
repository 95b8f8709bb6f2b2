//! The summary in words.

use super::lines::{Page, glued};
use super::values::{clock, since};
use crate::reading::{
    Answer, Extreme, Flashover, LimitSummary, RoomSummary, StationSummary, Summary, spoken,
};
use crate::record::{Dimension, Ended};

/// A value that stays on one line.
fn value(value: f64, dimension: Dimension) -> String {
    glued(&super::values::value(value, dimension))
}

/// Writes the summary.
pub(super) fn write(page: &mut Page, summary: &Summary) {
    page.heading("SUMMARY");
    fire(page, summary);
    for room in &summary.rooms {
        if let Some(text) = room_words(summary, room) {
            page.entry(&spoken(&room.name), &text);
        }
    }
    for station in &summary.stations {
        station_words(page, summary, station);
    }
    if let Some(pressure) = summary.highest_pressure {
        page.entry("strongest pressure", &at(pressure, Dimension::Pressure));
    }
    page.entry("run", &ended(summary));
    closures(page, summary);
}

/// Value and time of an extreme.
fn at(extreme: Extreme, dimension: Dimension) -> String {
    format!(
        "{} at {}",
        value(extreme.value, dimension),
        clock(extreme.time)
    )
}

/// Value and time of an extreme, with the time since the first opening.
fn at_since(summary: &Summary, extreme: Extreme, dimension: Dimension) -> String {
    let text = at(extreme, dimension);
    match &summary.first_opening {
        Some(first) if extreme.time >= first.time => {
            format!("{text} ({})", since(extreme.time - first.time))
        }
        _ => text,
    }
}

fn fire(page: &mut Page, summary: &Summary) {
    if let Some(first) = &summary.first_opening {
        let text = format!("{}, at {}", spoken(&first.action), clock(first.time));
        page.entry(
            "first opening",
            &format!("{text}; times with + count from it"),
        );
    }
    if let Some(peak) = summary.peak_before {
        let mut text = at(peak, Dimension::Power);
        if summary.first_opening.is_some() {
            text.push_str(" before the first opening");
        }
        if let Some(lowest) = summary.lowest_before {
            text = format!("{text}, then down to {}", at(lowest, Dimension::Power));
        }
        page.entry("heat burned", &text);
    }
    if let Some(peak) = summary.peak_after {
        let mut text = format!("{} after it", at_since(summary, peak, Dimension::Power));
        if let Some(air) = summary.air_could_burn_at_peak {
            let air = value(air, Dimension::Power);
            text = format!("{text}; the incoming air could then burn {air}");
        }
        page.entry("", &text);
    }
    let stretches: Vec<String> = summary
        .short_of_air
        .iter()
        .map(|stretch| match stretch.to {
            Some(to) => format!("{} to {}", clock(stretch.from), clock(to)),
            None => format!("{} to the end", clock(stretch.from)),
        })
        .collect();
    let text = if stretches.is_empty() {
        "never in the model".to_owned()
    } else {
        stretches.join(", ")
    };
    page.entry("short of air", &text);
    if let Some(lowest) = summary.lowest_base_oxygen {
        let text = format!(
            "lowest {}",
            at_since(summary, lowest, Dimension::VolumeFraction)
        );
        page.entry("oxygen at the flame", &text);
    }
}

fn room_words(summary: &Summary, room: &RoomSummary) -> Option<String> {
    let mut parts = Vec::new();
    if let Some(hottest) = room.hottest_layer {
        let text = at_since(summary, hottest, Dimension::Temperature);
        parts.push(format!("smoke layer up to {text}"));
    }
    if let Some(lowest) = room.lowest_smoke_level {
        let text = at_since(summary, lowest, Dimension::Length);
        parts.push(format!("smoke down to {text}"));
    }
    let readings = [
        (
            room.flashover_before,
            summary
                .first_opening
                .is_some()
                .then_some("before the opening"),
        ),
        (room.flashover_after, Some("after it")),
    ];
    let worth = |reading: &Flashover| reading.word != Answer::No;
    let told = readings
        .iter()
        .any(|(reading, _)| reading.as_ref().is_some_and(worth));
    let answers: Vec<String> = readings
        .iter()
        .filter_map(|(reading, when)| Some(flashover(reading.as_ref()?, *when)))
        .collect();
    if told {
        parts.push(format!("flashover: {}", answers.join("; ")));
    } else if !answers.is_empty() {
        parts.push("flashover: no".to_owned());
    }
    (!parts.is_empty()).then(|| parts.join("; "))
}

/// One reading of flashover, with what each criterion says.
fn flashover(reading: &Flashover, when: Option<&str>) -> String {
    let when = when.map_or_else(String::new, |when| format!("{when} "));
    format!(
        "{when}{}: {} by the layer, {}, and {} by the radiation on the floor, {}",
        reading.word.word(),
        reading.by_layer.word(),
        value(reading.hottest_layer, Dimension::Temperature),
        reading.by_floor_flux.word(),
        value(reading.highest_flux, Dimension::Flux),
    )
}

fn station_words(page: &mut Page, summary: &Summary, station: &StationSummary) {
    let place = format!(
        "{}, {}, head at {}",
        spoken(&station.room),
        station.posture,
        value(station.height, Dimension::Length),
    );
    page.entry(&format!("station {}", spoken(&station.name)), &place);
    for limit in &station.limits {
        page.entry("", &limit_words(summary, limit));
    }
    let worst: Vec<String> = station
        .worst
        .iter()
        .map(|worst| {
            let text = at_since(summary, worst.extreme, worst.quantity.dimension());
            format!("{} {text}", worst.quantity.label())
        })
        .collect();
    if !worst.is_empty() {
        page.entry("", &format!("worst: {}", worst.join("; ")));
    }
}

/// One limit: when it is reached, or that it is not.
fn limit_words(summary: &Summary, limit: &LimitSummary) -> String {
    let what = format!("{}, {}", limit.words, value(limit.limit, limit.dimension));
    let Some(first) = limit.first else {
        return format!("{what}: not reached in the model");
    };
    let mut text = format!("{what}: first at {}", clock(first));
    if let Some(opening) = &summary.first_opening {
        match limit.first_after_opening {
            Some(after) if after > opening.time => {
                text = format!(
                    "{text}, after the opening at {}",
                    since(after - opening.time)
                );
            }
            Some(_) => text.push_str(", still so at the opening"),
            None => text.push_str(", not again after the opening"),
        }
    }
    text
}

fn ended(summary: &Summary) -> String {
    match &summary.ended {
        Ended::Completed => format!("complete, {}", clock(summary.end)),
        Ended::Interrupted(time) => {
            format!(
                "stopped by the user at {}; later moments are missing",
                clock(*time)
            )
        }
        Ended::Failed(time, why) => {
            format!(
                "could not go on at {}: {why}; later moments are missing",
                clock(*time)
            )
        }
    }
}

/// Closure of the ledger in one entry.
fn closures(page: &mut Page, summary: &Summary) {
    let closures = &summary.closures;
    let text = format!(
        "closes to {:.0e} in mass, {:.0e} in energy, {:.0e} in oxygen, {:.0e} in carbon",
        closures.mass, closures.energy, closures.oxygen, closures.carbon,
    );
    page.entry("ledger", &text);
}
