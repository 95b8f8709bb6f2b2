//! What is done to openings, and how a run that broke off ended.

use super::moment::{Kind, Moment, Weight, spoken};
use super::reader::{Played, Reader};
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
    let Some(item) = reader.main_item() else {
        return moment;
    };
    let base = reader.history(Subject::Item(item), Quantity::BaseOxygen);
    let room = reader.plan.items.get(item).map_or(0, |item| item.room.0);
    let layer = reader.history(Subject::Room(room), Quantity::UpperTemperature);
    moment
        .with(
            "oxygen at the flame base",
            base.at(time),
            Dimension::VolumeFraction,
        )
        .with(
            "smoke layer over the fire",
            layer.at(time),
            Dimension::Temperature,
        )
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
