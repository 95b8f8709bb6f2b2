//! What is reached at the stations: the limits of temperature, oxygen and
//! visibility, and smoke at head height.

use super::history::Side;
use super::moment::{Kind, Moment, Weight, spoken};
use super::reader::Reader;
use crate::plan::Station;
use crate::record::{Dimension, Quantity, Subject};

/// A limit at a station.
#[derive(Debug, Clone, Copy)]
pub(super) struct Limit {
    /// Kind of moment when it is reached.
    pub kind: Kind,
    /// What is limited.
    pub quantity: Quantity,
    /// The limit, SI.
    pub value: f64,
    /// On which side it is reached.
    pub side: Side,
    /// In plain words.
    pub words: &'static str,
    weight: Weight,
}

/// The limits of a station, in the order of reports.
pub(super) fn limits(station: &Station) -> [Limit; 4] {
    let limits = &station.limits;
    [
        Limit {
            kind: Kind::LowVisibility,
            quantity: Quantity::StationVisibility,
            value: limits.visibility,
            side: Side::Below,
            words: "visibility at its limit",
            weight: Weight::Plain,
        },
        Limit {
            kind: Kind::Attention,
            quantity: Quantity::StationTemperature,
            value: limits.attention_temperature,
            side: Side::Above,
            words: "temperature at the training limit 'attention'",
            weight: Weight::Plain,
        },
        Limit {
            kind: Kind::Out,
            quantity: Quantity::StationTemperature,
            value: limits.out_temperature,
            side: Side::Above,
            words: "temperature at the training limit 'be out'",
            weight: Weight::Headline,
        },
        Limit {
            kind: Kind::LowOxygen,
            quantity: Quantity::StationOxygen,
            value: limits.oxygen,
            side: Side::Below,
            words: "oxygen at its limit",
            weight: Weight::Plain,
        },
    ]
}

/// All moments of the stations.
pub(super) fn moments(reader: &Reader<'_>) -> Vec<Moment> {
    let mut out = Vec::new();
    for (index, station) in reader.plan.stations.iter().enumerate() {
        out.extend(smoke_at_head(reader, index, station));
        for limit in limits(station) {
            out.extend(reached(reader, index, station, limit));
        }
    }
    out
}

/// Station in words. A place, since somebody may not be there yet.
fn place(station: &Station) -> String {
    format!("at the place of {}", spoken(&station.name))
}

fn reached(reader: &Reader<'_>, index: usize, station: &Station, limit: Limit) -> Vec<Moment> {
    let subject = Subject::Station(index);
    let history = reader.history(subject, limit.quantity);
    let place = place(station);
    reader
        .by_stage(history, limit.side, limit.value)
        .into_iter()
        .map(|spell| {
            let text = format!("{place}: {}", limit.words);
            reader
                .moment(spell.start, limit.kind, subject, text)
                .with(
                    limit.quantity.label(),
                    limit.value,
                    limit.quantity.dimension(),
                )
                .with_spell(spell)
                .within(reader.band(spell.start))
                .weighing(limit.weight)
        })
        .collect()
}

fn smoke_at_head(reader: &Reader<'_>, index: usize, station: &Station) -> Vec<Moment> {
    let level = reader.history(Subject::Room(station.room.0), Quantity::Interface);
    let place = place(station);
    reader
        .by_stage(level, Side::Below, station.height)
        .into_iter()
        .enumerate()
        .map(|(number, spell)| {
            let text = format!("{place}: smoke down to head height");
            reader
                .moment(
                    spell.start,
                    Kind::SmokeAtHead,
                    Subject::Station(index),
                    text,
                )
                .with("smoke level", station.height, Dimension::Length)
                .with_spell(spell)
                .weighing(if number == 0 {
                    Weight::Plain
                } else {
                    Weight::Detail
                })
        })
        .collect()
}
