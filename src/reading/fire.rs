//! The fire as one: lit, short of air, out, at its peak, back, burned out.

use super::history::{History, Side};
use super::moment::{Kind, Moment, Weight, spoken};
use super::reader::Reader;
use crate::plan::Burning;
use crate::record::{Dimension, Quantity, Subject};

/// Short of air below this share of the free rate.
pub(super) const SHORT_OF_AIR: f64 = 0.5;

/// Flames out below this share of the free rate.
const FLAMES_OUT: f64 = 0.05;

/// Back up above this many times the starved level.
const BACK_UP: f64 = 3.0;

/// The starved level is the mean over this long before the opening, s
/// \[choice\]: it evens out part of the pulses of a starved fire.
const LEVEL_TIME: f64 = 60.0;

/// The starved level counts as no less than this share of the peak before it
/// \[choice\]: three times an ember bed is not yet a fire.
const SMALLEST_LEVEL: f64 = 0.02;

/// A later peak counts from this factor above the heat burned when its stage
/// began \[choice\].
const PEAK_GROWTH: f64 = 1.2;

/// A peak counts from this share of the highest peak of the run \[choice\].
const SMALLEST_PEAK: f64 = 0.05;

/// Burned out when less than this share of the fuel is left \[choice\].
const FUEL_LEFT: f64 = 0.05;

/// A given rate has ended below this share of its peak \[choice\].
const RATE_ENDED: f64 = 0.01;

/// All moments of the fire.
pub(super) fn moments(reader: &Reader<'_>) -> Vec<Moment> {
    let mut out = ignitions(reader);
    out.extend(short_of_air(reader));
    out.extend(flames_out(reader));
    out.extend(peaks(reader));
    out.extend(back_up(reader));
    out.extend(burned_out(reader));
    out
}

fn ignitions(reader: &Reader<'_>) -> Vec<Moment> {
    let lit = |(index, item): (usize, &crate::plan::Item)| {
        (item.ignition <= reader.end && !reader.record.time.is_empty()).then(|| {
            let room = reader.room_name(item.room.0);
            let text = format!("{} in the {room} is lit", spoken(&item.name));
            reader.moment(item.ignition, Kind::Ignition, Subject::Item(index), text)
        })
    };
    reader
        .plan
        .items
        .iter()
        .enumerate()
        .filter_map(lit)
        .collect()
}

fn short_of_air(reader: &Reader<'_>) -> Vec<Moment> {
    reader
        .by_stage(reader.burned_over_free(), Side::Below, SHORT_OF_AIR)
        .into_iter()
        .map(|spell| {
            let text = "fire short of air: burns less than half of what it would in the open";
            reader
                .moment(
                    spell.start,
                    Kind::ShortOfAir,
                    Subject::House,
                    text.to_owned(),
                )
                .with(
                    "heat burned",
                    reader.burned().at(spell.start),
                    Dimension::Power,
                )
                .with("free rate", reader.free().at(spell.start), Dimension::Power)
                .with_spell(spell)
                .weighing(Weight::Headline)
        })
        .collect()
}

fn flames_out(reader: &Reader<'_>) -> Vec<Moment> {
    reader
        .by_stage(reader.burned_over_free(), Side::Below, FLAMES_OUT)
        .into_iter()
        .map(|spell| {
            let text = "flames all but out; what is left glows or flickers";
            reader
                .moment(
                    spell.start,
                    Kind::FlamesOut,
                    Subject::House,
                    text.to_owned(),
                )
                .with(
                    "heat burned",
                    reader.burned().at(spell.start),
                    Dimension::Power,
                )
                .with("free rate", reader.free().at(spell.start), Dimension::Power)
                .with_spell(spell)
                .weighing(Weight::Headline)
        })
        .collect()
}

/// First and last time of each stage between actions.
fn stages(reader: &Reader<'_>) -> Vec<(f64, f64)> {
    let mut edges = vec![0.0];
    edges.extend(
        reader
            .stage_starts()
            .into_iter()
            .filter(|&start| start > 0.0),
    );
    edges.push(reader.end);
    edges.windows(2).map(|pair| (pair[0], pair[1])).collect()
}

fn peaks(reader: &Reader<'_>) -> Vec<Moment> {
    let burned = reader.burned();
    let highest = burned
        .largest(0.0, reader.end)
        .map_or(0.0, |(_, value)| value);
    let mut out = Vec::new();
    for (number, (from, to)) in stages(reader).into_iter().enumerate() {
        let Some((time, value)) = burned.largest(from, to) else {
            continue;
        };
        let inside = time > from && time < to;
        let grown = number == 0 || value > PEAK_GROWTH * burned.at(from);
        if inside && grown && value > SMALLEST_PEAK * highest {
            let text = if number == 0 {
                "most heat burned before anything is changed"
            } else {
                "most heat burned after that"
            };
            let text = if reader.played.is_empty() {
                "most heat burned"
            } else {
                text
            };
            out.push(
                reader
                    .moment(time, Kind::Peak, Subject::House, text.to_owned())
                    .with("heat burned", value, Dimension::Power)
                    .within(reader.band(time)),
            );
        }
    }
    out
}

/// What the fire burned before an opening, W, when it was short of air then.
pub(super) fn starved_level(reader: &Reader<'_>, opening: f64) -> Option<f64> {
    let ratio = reader.burned_over_free();
    let level = reader.burned().mean(opening - LEVEL_TIME, opening);
    let short = ratio.at(opening) < SHORT_OF_AIR
        || ratio.mean(opening - LEVEL_TIME, opening) < SHORT_OF_AIR;
    let peak = reader.burned().largest(0.0, opening)?.1;
    (short && level.is_finite()).then(|| level.max(SMALLEST_LEVEL * peak))
}

/// Back above three times the starved level, once after each opening on a
/// fire short of air.
pub(super) fn back_up(reader: &Reader<'_>) -> Vec<Moment> {
    let openings: Vec<_> = reader.played.iter().filter(|p| p.opens()).collect();
    let mut out = Vec::new();
    for (number, opening) in openings.iter().enumerate() {
        let from = opening.time;
        // A later opening on a fire that is back already does not end the wait.
        let to = openings[number + 1..]
            .iter()
            .find(|next| starved_level(reader, next.time).is_some())
            .map_or(reader.end, |next| next.time);
        let Some(level) = starved_level(reader, from) else {
            continue;
        };
        let found = reader
            .burned()
            .spells(Side::Above, BACK_UP * level)
            .into_iter()
            .find(|spell| spell.start > from && spell.start <= to);
        if let Some(spell) = found {
            let text = "fire comes back: three times its starved level";
            out.push(
                reader
                    .moment(spell.start, Kind::BackUp, Subject::House, text.to_owned())
                    .with("heat burned", BACK_UP * level, Dimension::Power)
                    .with("starved level", level, Dimension::Power)
                    .within(reader.band(spell.start))
                    .weighing(Weight::Headline),
            );
        }
    }
    out
}

fn burned_out(reader: &Reader<'_>) -> Vec<Moment> {
    let mut out = Vec::new();
    for (index, item) in reader.plan.items.iter().enumerate() {
        let subject = Subject::Item(index);
        if let Some(time) = burned_out_at(reader, index) {
            let left = reader.history(subject, Quantity::FuelLeft).at(time);
            let text = format!("{} is burned out", spoken(&item.name));
            out.push(reader.moment(time, Kind::BurnedOut, subject, text).with(
                "fuel left",
                left,
                Dimension::Mass,
            ));
        }
    }
    out
}

/// When an item is burned out, s.
pub(super) fn burned_out_at(reader: &Reader<'_>, item: usize) -> Option<f64> {
    let subject = Subject::Item(item);
    match reader.plan.items.get(item)?.burning {
        Burning::Growing(_) => fuel_gone(reader, reader.history(subject, Quantity::FuelLeft)),
        Burning::AsGiven(_) | Burning::Burner { .. } => {
            rate_ended(reader, reader.history(subject, Quantity::FreeRate))
        }
    }
}

/// Time at which the fuel left falls below its share of what there was.
fn fuel_gone(reader: &Reader<'_>, left: History<'_>) -> Option<f64> {
    let (_, most) = left.largest(0.0, reader.end)?;
    let spells = left.spells(Side::Below, FUEL_LEFT * most);
    spells.first().map(|spell| spell.start)
}

/// Time after its peak from which a given rate stays at nothing.
fn rate_ended(reader: &Reader<'_>, rate: History<'_>) -> Option<f64> {
    let (peak_time, peak) = rate.largest(0.0, reader.end)?;
    let last = rate.spells(Side::Below, RATE_ENDED * peak).pop()?;
    (peak > 0.0 && last.end.is_none() && last.start > peak_time).then_some(last.start)
}
