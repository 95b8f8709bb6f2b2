//! What the rooms do: smoke at the door head, hot layers, radiation on the
//! floor, flashover, pressure.

use super::flashover;
use super::history::{History, Side};
use super::moment::{Kind, Moment, Weight};
use super::reader::Reader;
use super::summary::Stretch;
use crate::physics::visibility::{REFLECTING, visibility};
use crate::record::{Dimension, Quantity, Subject};

/// 0 °C, K.
const ZERO_CELSIUS: f64 = 273.15;

/// Layer temperatures that are watched, K: 500 and 600 °C.
const LAYER_500: f64 = 500.0 + ZERO_CELSIUS;
const LAYER_600: f64 = 600.0 + ZERO_CELSIUS;

/// Pressure beyond which windows and doors may give way, Pa: 500, by common
/// practice; doors are hard to open from about 80 Pa on.
const HIGH_PRESSURE: f64 = 500.0;

/// Share of the upper layer's soot from which the lower layer is smoky itself
/// \[choice\].
const SMOKY_SHARE: f64 = 0.3;

/// Visibility below which the lower layer is smoky itself, m \[choice\].
const SMOKY_VISIBILITY: f64 = 2.0;

/// Visibility in the upper layer above which a room has no smoke worth the
/// name, m \[choice\].
const CLEAR: f64 = 3.0;

/// Largest visibility that is reckoned, m, as at the stations.
const FAR: f64 = 30.0;

/// A criterion this close to the flashover that it completes is said with it,
/// s \[choice\].
const SAME_TIME: f64 = 1.0;

/// All moments of the rooms.
pub(super) fn moments(reader: &Reader<'_>) -> Vec<Moment> {
    let mut out = Vec::new();
    for room in 0..reader.plan.rooms.len() {
        out.extend(smoke_at_door_head(reader, room));
        out.extend(smoke_to_floor(reader, room));
        let flashovers = flashovers(reader, room);
        let mut criteria = layer(reader, room, Kind::LayerAt500, LAYER_500);
        criteria.extend(layer(reader, room, Kind::LayerAt600, LAYER_600));
        criteria.extend(floor_flux(reader, room));
        for moment in &mut criteria {
            let said = |flashover: &Moment| (flashover.time - moment.time).abs() < SAME_TIME;
            if flashovers.iter().any(said) {
                moment.weight = Weight::Detail;
            }
        }
        out.extend(criteria);
        out.extend(flashovers);
    }
    out.extend(high_pressure(reader));
    out
}

/// Smoke comes down to the door head for the first time, in rooms with fire
/// or people.
fn smoke_at_door_head(reader: &Reader<'_>, room: usize) -> Option<Moment> {
    let plan = reader.plan;
    let fire = plan.items.iter().any(|item| item.room.0 == room);
    let people = plan.stations.iter().any(|station| station.room.0 == room);
    if !fire && !people {
        return None;
    }
    let (head, opening) = reader.highest_head(room)?;
    let subject = Subject::Room(room);
    let level = reader.history(subject, Quantity::Interface);
    let spell = level.spells(Side::Below, head).into_iter().next()?;
    let name = reader.room_name(room);
    let text = format!("smoke in the {name} down to the head of the {opening}");
    let layer = reader.history(subject, Quantity::UpperTemperature);
    Some(
        reader
            .moment(spell.start, Kind::SmokeAtDoorHead, subject, text)
            .with("smoke level", head, Dimension::Length)
            .with("smoke layer", layer.at(spell.start), Dimension::Temperature)
            .weighing(if fire { Weight::Plain } else { Weight::Detail }),
    )
}

/// True in rooms with fire or people.
fn matters(reader: &Reader<'_>, room: usize) -> bool {
    let plan = reader.plan;
    plan.items.iter().any(|item| item.room.0 == room)
        || plan.stations.iter().any(|station| station.room.0 == room)
}

/// How smoky the lower layer is: 1 or more from where the smoke counts as
/// down to the floor. Nothing where the upper layer is clear itself.
fn smokiness(reader: &Reader<'_>, room: usize) -> Vec<f64> {
    let of = |quantity| reader.record.get(Subject::Room(room), quantity);
    of(Quantity::LowerSoot)
        .iter()
        .zip(of(Quantity::UpperSoot))
        .map(|(lower, upper)| {
            let seen = |soot: f64| visibility(REFLECTING, soot, FAR);
            if lower.is_nan() || upper.is_nan() {
                f64::NAN
            } else if seen(*upper) > CLEAR {
                0.0
            } else {
                (lower / (SMOKY_SHARE * upper)).max(SMOKY_VISIBILITY / seen(*lower))
            }
        })
        .collect()
}

/// When the smoke of a room reaches to the floor.
pub fn smoke_to_floor_stretches(reader: &Reader<'_>, room: usize) -> Vec<Stretch> {
    let smoky = smokiness(reader, room);
    History::new(&reader.record.time, &smoky)
        .spells(Side::Above, 1.0)
        .into_iter()
        .map(|spell| Stretch {
            from: spell.start,
            to: spell.end,
        })
        .collect()
}

fn smoke_to_floor(reader: &Reader<'_>, room: usize) -> Vec<Moment> {
    let subject = Subject::Room(room);
    let smoky = smokiness(reader, room);
    let name = reader.room_name(room);
    let weight = if matters(reader, room) {
        Weight::Plain
    } else {
        Weight::Detail
    };
    reader
        .by_stage(History::new(&reader.record.time, &smoky), Side::Above, 1.0)
        .into_iter()
        .map(|spell| {
            let text = format!("{name}: smoke to the floor");
            let lower = reader.history(subject, Quantity::LowerSoot).at(spell.start);
            reader
                .moment(spell.start, Kind::SmokeToFloor, subject, text)
                .with(
                    "visibility below the smoke level",
                    visibility(REFLECTING, lower, FAR),
                    Dimension::Length,
                )
                .with_spell(spell)
                .weighing(weight)
        })
        .collect()
}

/// Layer of a room reaches a temperature.
fn layer(reader: &Reader<'_>, room: usize, kind: Kind, temperature: f64) -> Vec<Moment> {
    let subject = Subject::Room(room);
    let history = reader.history(subject, Quantity::UpperTemperature);
    let what = match kind {
        Kind::LayerAt500 => "smoke layer near flashover",
        _ => "smoke layer at flashover",
    };
    let text = format!("{}: {what}", reader.room_name(room));
    reader
        .by_stage(history, Side::Above, temperature)
        .into_iter()
        .map(|spell| {
            reader
                .moment(spell.start, kind, subject, text.clone())
                .with("smoke layer", temperature, Dimension::Temperature)
                .with(
                    "smoke level",
                    level(reader, room, spell.start),
                    Dimension::Length,
                )
                .with(
                    "heat release",
                    reader.burned().at(spell.start),
                    Dimension::Power,
                )
                .with_spell(spell)
                .within(reader.band(spell.start))
        })
        .collect()
}

/// Radiation on the floor reaches 20 kW/m2.
fn floor_flux(reader: &Reader<'_>, room: usize) -> Vec<Moment> {
    let subject = Subject::Room(room);
    let history = reader.history(subject, Quantity::FloorFlux);
    let layer = reader.history(subject, Quantity::UpperTemperature);
    let name = reader.room_name(room);
    reader
        .by_stage(history, Side::Above, flashover::FLOOR_FLUX)
        .into_iter()
        .map(|spell| {
            let text = format!("{name}: enough radiation on the floor to light what lies there");
            reader
                .moment(spell.start, Kind::FloorFlux, subject, text)
                .with(
                    "radiant flux on the floor",
                    flashover::FLOOR_FLUX,
                    Dimension::Flux,
                )
                .with("smoke layer", layer.at(spell.start), Dimension::Temperature)
                .with_spell(spell)
                .within(reader.band(spell.start))
        })
        .collect()
}

/// Flashover by both criteria, once for each stage.
fn flashovers(reader: &Reader<'_>, room: usize) -> Vec<Moment> {
    let subject = Subject::Room(room);
    let layer = reader.history(subject, Quantity::UpperTemperature);
    let flux = reader.history(subject, Quantity::FloorFlux);
    let margin = flashover::margin(reader, room);
    let both = super::history::History::new(&reader.record.time, &margin);
    let name = reader.room_name(room);
    reader
        .by_stage(both, Side::Above, 1.0)
        .into_iter()
        .map(|spell| {
            let text = format!("{name}: flashover by both criteria");
            reader
                .moment(spell.start, Kind::Flashover, subject, text)
                .with("smoke layer", layer.at(spell.start), Dimension::Temperature)
                .with(
                    "radiant flux on the floor",
                    flux.at(spell.start),
                    Dimension::Flux,
                )
                .with_spell(spell)
                .within(reader.band(spell.start))
                .weighing(Weight::Headline)
        })
        .collect()
}

/// Pressure beyond 500 Pa either way, in the room where it is highest.
fn high_pressure(reader: &Reader<'_>) -> Vec<Moment> {
    let mut size: Vec<f64> = vec![f64::NAN; reader.record.time.len()];
    for room in 0..reader.plan.rooms.len() {
        let pressure = reader.record.get(Subject::Room(room), Quantity::Pressure);
        for (size, pressure) in size.iter_mut().zip(pressure) {
            *size = size.max(pressure.abs());
        }
    }
    let history = super::history::History::new(&reader.record.time, &size);
    reader
        .by_stage(history, Side::Above, HIGH_PRESSURE)
        .into_iter()
        .map(|spell| {
            let text = "pressure at which windows or doors may give way; none does in the model";
            let most = history.largest(spell.start, spell.end.unwrap_or(reader.end));
            reader
                .moment(
                    spell.start,
                    Kind::HighPressure,
                    Subject::House,
                    text.to_owned(),
                )
                .with(
                    "highest",
                    most.map_or(f64::NAN, |(_, value)| value),
                    Dimension::Pressure,
                )
                .with_spell(spell)
        })
        .collect()
}

/// Smoke level of a room at a time, m.
fn level(reader: &Reader<'_>, room: usize, time: f64) -> f64 {
    reader
        .history(Subject::Room(room), Quantity::Interface)
        .at(time)
}
