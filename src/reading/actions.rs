//! What is done to openings, and how a run that broke off ended.

use super::moment::{Kind, Moment, Weight, spoken};
use super::reader::{Played, Reader};
use crate::plan::{Effect, Space};
use crate::record::{Dimension, Ended, Quantity, Subject};

/// All actions that were played.
pub(super) fn moments(reader: &Reader<'_>) -> Vec<Moment> {
    reader
        .played
        .iter()
        .map(|played| action(reader, played))
        .collect()
}

/// One action, with the state of the fire that it meets.
fn action(reader: &Reader<'_>, played: &Played<'_>) -> Moment {
    let time = played.time;
    let subject = played.opening().map_or(Subject::House, Subject::Opening);
    let moment = reader
        .moment(time, Kind::Action, subject, words(reader, played))
        .with(
            "clear width",
            played
                .after()
                .filter(|width| *width > 0.0)
                .unwrap_or(f64::NAN),
            Dimension::Length,
        )
        .with("heat release", reader.burned().at(time), Dimension::Power)
        .weighing(Weight::Headline);
    let moment = match reader.main_item() {
        Some(item) => at_the_fire(reader, moment, item),
        None => moment,
    };
    at_stations(reader, moment, played)
}

/// Adds what the fire breathes and the layer over it.
fn at_the_fire(reader: &Reader<'_>, moment: Moment, item: usize) -> Moment {
    let time = moment.time;
    let base = reader.history(Subject::Item(item), Quantity::BaseOxygen);
    let room = reader.plan.items.get(item).map_or(0, |item| item.room.0);
    let layer = reader.history(Subject::Room(room), Quantity::UpperTemperature);
    let oxygen = base.at(time);
    moment
        .with(
            "oxygen at the flame base",
            oxygen,
            Dimension::VolumeFraction,
        )
        .with(
            "smoke layer over the fire",
            layer.at(time),
            Dimension::Temperature,
        )
}

/// Adds what people at the opening meet when it is changed.
fn at_stations(reader: &Reader<'_>, mut moment: Moment, played: &Played<'_>) -> Moment {
    let opening = played
        .opening()
        .and_then(|index| reader.plan.openings.get(index));
    let Some(opening) = opening else {
        return moment;
    };
    let sides = [opening.from, opening.to];
    for (index, station) in reader.plan.stations.iter().enumerate() {
        if !sides.contains(&Space::Room(station.room)) {
            continue;
        }
        let name = spoken(&station.name);
        for (quantity, what) in [
            (Quantity::StationTemperature, "temperature"),
            (Quantity::StationVisibility, "visibility"),
        ] {
            let value = reader
                .history(Subject::Station(index), quantity)
                .at(moment.time);
            moment = moment.with(format!("{what} at {name}"), value, quantity.dimension());
        }
    }
    moment
}

/// The change in words: what becomes of the opening or fan, and why.
fn words(reader: &Reader<'_>, played: &Played<'_>) -> String {
    let subject = match played.effect {
        Effect::ClearWidth { opening, .. } => reader.plan.openings.get(opening.0).map(|o| &o.name),
        Effect::Fan { fan, .. } => reader.plan.fans.get(fan.0).map(|f| &f.name),
    };
    let subject = subject.map_or_else(String::new, |name| spoken(name));
    let what = match (played.effect, played.what) {
        (Effect::Fan { running: true, .. }, _) => "started".to_owned(),
        (Effect::Fan { running: false, .. }, _) => "stopped".to_owned(),
        _ if played.by_itself => played.what.to_owned(),
        (_, "open") => "opened".to_owned(),
        (_, "shut") => "shut".to_owned(),
        (_, other) if played.opens() => format!("opened to {other}"),
        (_, other) => format!("held at {other}"),
    };
    let text = if played.by_itself {
        format!("{subject} {what}")
    } else {
        format!("{}: {subject} {what}", spoken(played.name))
    };
    match played.because {
        Some(because) => format!("{text}; {because}"),
        None => text,
    }
}

/// A run that did not reach the end of its scenario.
pub(super) fn stopped(reader: &Reader<'_>) -> Option<Moment> {
    let (time, text) = match &reader.record.ended {
        Ended::Completed => return None,
        Ended::Interrupted(time) => (*time, "run stopped by the user".to_owned()),
        Ended::Failed(time, why) => (*time, format!("run could not go on: {why}")),
    };
    Some(
        reader
            .moment(time, Kind::Stopped, Subject::House, text)
            .weighing(Weight::Headline),
    )
}
