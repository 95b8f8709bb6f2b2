//! What is done to openings, and how a run that broke off ended.

use super::moment::{Kind, Moment, Weight, spoken};
use super::reader::{Played, Reader};
use crate::plan::Space;
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
    let time = played.action.time;
    let subject = Subject::Opening(played.action.opening.0);
    let moment = reader
        .moment(time, Kind::Action, subject, words(reader, played))
        .with("clear width", played.action.clear_width, Dimension::Length)
        .with("heat burned", reader.burned().at(time), Dimension::Power)
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
    let Some(opening) = reader.plan.openings.get(played.action.opening.0) else {
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

/// The action in words: what becomes of the opening, and why.
fn words(reader: &Reader<'_>, played: &Played<'_>) -> String {
    let action = played.action;
    let opening = reader.plan.openings.get(action.opening.0);
    let name = opening.map_or_else(String::new, |opening| spoken(&opening.name));
    let what = match action.what.as_str() {
        "open" => "opened".to_owned(),
        "shut" => "shut".to_owned(),
        other if played.opens() => format!("opened to {other}"),
        other => format!("held at {other}"),
    };
    match &action.because {
        Some(because) => format!("{}: {name} {what}; {because}", spoken(&action.name)),
        None => format!("{}: {name} {what}", spoken(&action.name)),
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
