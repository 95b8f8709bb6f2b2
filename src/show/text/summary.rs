//! The summary in words.

use super::lines::{Page, glued};
use super::values::{clock, metric};
use crate::reading::{
    Answer, Band, Comeback, Extreme, Flashover, FlowSummary, LimitSummary, RoomSummary, ShortOfAir,
    StationSummary, Stretch, Summary, spoken,
};
use crate::record::{Dimension, Ended, Quantity};

/// A value that stays on one line.
fn value(value: f64, dimension: Dimension) -> String {
    glued(&super::values::value(value, dimension))
}

/// Writes the summary.
pub(super) fn write(page: &mut Page, summary: &Summary) {
    page.heading("SUMMARY");
    fire(page, summary);
    for room in summary.rooms.iter().filter(|room| room.hot_layer) {
        if let Some(text) = room_words(summary, room) {
            page.entry(&spoken(&room.name), &text);
        }
    }
    let without: Vec<String> = summary
        .rooms
        .iter()
        .filter(|room| !room.hot_layer)
        .map(|room| spoken(&room.name))
        .collect();
    if !without.is_empty() {
        page.entry("no hot layer in", &without.join(", "));
    }
    for flow in &summary.flow {
        page.entry(&spoken(&flow.name), &flow_words(flow));
    }
    for station in &summary.stations {
        station_words(page, summary, station);
    }
    if let Some(pressure) = summary.highest_pressure {
        page.entry("strongest pressure", &at(pressure, Dimension::Pressure));
    }
    page.entry("run", &ended(summary));
    closures(page, summary);
    if !summary.notes.is_empty() {
        page.gap();
    }
    for note in &summary.notes {
        page.paragraph(note);
    }
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
    match after(summary, extreme.time) {
        after if after.is_empty() => text,
        after => format!("{text} ({after})"),
    }
}

fn fire(page: &mut Page, summary: &Summary) {
    if let Some(first) = &summary.first_opening {
        let text = format!("{}, at {}", spoken(&first.action), clock(first.time));
        page.entry("first opening", &text);
    }
    if let Some(peak) = summary.peak_before {
        let mut text = at(peak, Dimension::Power);
        if summary.first_opening.is_some() {
            text.push_str(" before the first opening");
        }
        if let Some(lowest) = summary.lowest_before {
            text = format!("{text}, then down to {}", at(lowest, Dimension::Power));
        }
        page.entry("heat release", &text);
    }
    if let Some(peak) = summary.peak_after {
        let mut text = at_since(summary, peak, Dimension::Power);
        if let Some(air) = summary.air_could_burn_at_peak {
            let air = value(air, Dimension::Power);
            text = format!(
                "{text}; the incoming air could burn up to {air} in the half minute before"
            );
        }
        page.entry("", &text);
    }
    if let Some(comeback) = &summary.comeback {
        page.entry("", &comeback_words(summary, comeback));
    }
    let text = if summary.short_of_air.is_empty() {
        "never in the model".to_owned()
    } else {
        shortages(&summary.short_of_air)
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

/// Times short of air in words, with what ends them.
fn shortages(all: &[ShortOfAir]) -> String {
    let words = |short: &ShortOfAir| {
        let stretch = Stretch {
            from: short.from,
            to: short.to,
        };
        let text = stretches(&[stretch]);
        match (short.has_air_again, short.half_again) {
            (false, _) => text,
            (true, Some(half)) => format!(
                "{text}, when it has air again, back to half of its free rate at {}",
                clock(half)
            ),
            (true, None) => {
                format!("{text}, when it has air again, not yet back to half of its free rate")
            }
        }
    };
    all.iter().map(words).collect::<Vec<_>>().join("; then ")
}

/// Stretches of time in words.
fn stretches(all: &[Stretch]) -> String {
    let all: Vec<String> = all
        .iter()
        .map(|stretch| match stretch.to {
            Some(to) => format!("{} to {}", clock(stretch.from), clock(to)),
            None => format!("{} to the end", clock(stretch.from)),
        })
        .collect();
    all.join(", ")
}

/// Which way gas goes through an opening.
fn flow_words(flow: &FlowSummary) -> String {
    let most =
        |extreme: Extreme, way: &str| format!("{way} up to {}", at(extreme, Dimension::MassFlow));
    let mut parts = vec![
        most(flow.strongest_forward, &flow.forward),
        most(flow.strongest_backward, &flow.backward),
    ];
    for (when, way) in [
        (&flow.only_forward, &flow.forward),
        (&flow.only_backward, &flow.backward),
    ] {
        if !when.is_empty() {
            parts.push(format!("all of it {way} {}", stretches(when)));
        }
    }
    if let Some(flame) = flow.longest_flame {
        parts.push(format!(
            "flame up to {} above its head",
            at(flame, Dimension::Length)
        ));
    }
    parts.join("; ")
}

/// Whether and when the fire comes back.
fn comeback_words(summary: &Summary, comeback: &Comeback) -> String {
    match comeback {
        Comeback::At { time, by, band } => {
            let text = format!("{} at {}", by.words(), clock(*time));
            let mut beside = vec![after(summary, *time)];
            beside.extend(band.map(|band| band_words(summary, band)));
            beside.retain(|words| !words.is_empty());
            if beside.is_empty() {
                text
            } else {
                format!("{text} ({})", beside.join("; "))
            }
        }
        Comeback::Grew {
            from,
            to,
            level,
            narrowed,
        } => {
            let mut text = format!(
                "grew from {} to {}, below three times its starved level of {}",
                value(*from, Dimension::Power),
                at(*to, Dimension::Power),
                value(*level, Dimension::Power),
            );
            if let Some(narrowed) = narrowed {
                let done = if narrowed.shut { "shut" } else { "narrowed" };
                let name = spoken(&narrowed.opening);
                text = format!("{text}; {name} {done} at {}", clock(narrowed.time));
            }
            text
        }
        Comeback::NotInTheModel => "does not come back within the run, in the model".to_owned(),
    }
}

/// A band on the clock of the first opening.
fn band_words(summary: &Summary, band: Band) -> String {
    let opened = summary
        .first_opening
        .as_ref()
        .map_or(0.0, |first| first.time);
    let earliest = clock(band.earliest - opened);
    let latest = clock(band.latest - opened);
    glued(&format!("band {earliest} to {latest} after it"))
}

/// Time after the first opening in words; none before it.
fn after(summary: &Summary, time: f64) -> String {
    match &summary.first_opening {
        Some(first) if time >= first.time => match clock(time - first.time) {
            delay if delay == "0:00" => format!("at {}", spoken(&first.action)),
            delay => format!("{delay} after {}", spoken(&first.action)),
        },
        _ => String::new(),
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
    if !room.smoke_to_floor.is_empty() {
        let when = stretches(&room.smoke_to_floor);
        parts.push(format!("smoke to the floor {when}"));
    }
    if !room.mixed.is_empty() {
        parts.push(format!("mixed by momentum {}", stretches(&room.mixed)));
    }
    parts.extend(flashover_words(summary, room));
    (!parts.is_empty()).then(|| parts.join("; "))
}

/// Flashover with its criteria.
const FLASHOVER: &str = "flashover (600\u{a0}°C, 20\u{a0}kW/m2)";

/// Flashover before and after the first opening, with what each criterion
/// says where it is not a plain no.
fn flashover_words(summary: &Summary, room: &RoomSummary) -> Option<String> {
    let before = if summary.first_opening.is_some() {
        "before the opening "
    } else {
        ""
    };
    let readings: Vec<(&Flashover, &str)> = room
        .flashover_before
        .iter()
        .map(|reading| (reading, before))
        .chain(
            room.flashover_after
                .iter()
                .map(|reading| (reading, "after the opening ")),
        )
        .collect();
    if readings.is_empty() {
        return None;
    }
    if readings
        .iter()
        .all(|(reading, _)| reading.word == Answer::No)
    {
        return Some(format!("{FLASHOVER}: no"));
    }
    let words: Vec<String> = readings
        .into_iter()
        .map(|(reading, when)| {
            format!(
                "{when}{} (layer {}: {}, floor {}: {})",
                reading.word.word(),
                glued(&metric(reading.hottest_layer, Dimension::Temperature)),
                reading.by_layer.word(),
                glued(&metric(reading.highest_flux, Dimension::Flux)),
                reading.by_floor_flux.word(),
            )
        })
        .collect();
    Some(format!("{FLASHOVER}: {}", words.join("; ")))
}

fn station_words(page: &mut Page, summary: &Summary, station: &StationSummary) {
    let place = format!(
        "{}, {}, head at {}",
        spoken(&station.room),
        station.posture,
        value(station.height, Dimension::Length),
    );
    page.entry(&format!("place of {}", spoken(&station.name)), &place);
    for limit in &station.limits {
        page.entry("", &limit_words(summary, limit));
    }
    let worst: Vec<String> = station
        .worst
        .iter()
        .map(|worst| {
            let text = at_since(summary, worst.extreme, worst.quantity.dimension());
            let label = match worst.quantity {
                Quantity::StationCarbonMonoxide
                    if !summary.short_of_air.is_empty() && worst.extreme.value > LEAST_TOLD =>
                {
                    "CO at least"
                }
                quantity => quantity.label(),
            };
            format!("{label} {text}")
        })
        .collect();
    if !worst.is_empty() {
        page.entry("", &format!("worst: {}", worst.join("; ")));
    }
}

/// Volume fractions that round to nothing are no lower bound worth a word.
const LEAST_TOLD: f64 = 5e-5;

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
                    "{text}; again {} after {}",
                    clock(after - opening.time),
                    spoken(&opening.action)
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

/// Largest relative closure that counts as closed: of energy, which is
/// relative to the heat released, and of atoms and mass.
const ENERGY_CLOSED: f64 = 1e-3;
const ATOMS_CLOSED: f64 = 1e-6;

/// Whether the books close; the numbers stand in the details.
fn closures(page: &mut Page, summary: &Summary) {
    let closures = &summary.closures;
    let closed = closures.energy.abs() <= ENERGY_CLOSED
        && [closures.mass, closures.oxygen, closures.carbon]
            .iter()
            .all(|closure| closure.abs() <= ATOMS_CLOSED);
    let text = if closed {
        "closed"
    } else {
        "NOT closed, do not use this run; --details gives the numbers"
    };
    page.entry(
        "balance",
        &format!("mass, energy, oxygen and carbon: {text}"),
    );
}
