//! The fire as one: lit, short of air, out, at its peak, back, burned out.

use serde::Serialize;

use super::flashover;
use super::history::{History, Side};
use super::moment::{Kind, Moment, Weight, spoken};
use super::reader::Reader;
use super::summary::{Comeback, Extreme, Narrowed};
use crate::plan::Burning;
use crate::record::{Dimension, Quantity, Subject};

/// Short of air below this share of the free rate.
pub(super) const SHORT_OF_AIR: f64 = 0.5;

/// Flames out below this share of the free rate.
const FLAMES_OUT: f64 = 0.05;

/// Back up above this many times the starved level.
const BACK_UP: f64 = 3.0;

/// The starved level is the mean over this long before the opening, s
/// \[choice\], or the value at the opening where that is smaller: the mean
/// evens out part of the pulses of a starved fire, and a fire that is still
/// going down has not starved at its mean.
const LEVEL_TIME: f64 = 60.0;

/// The starved level counts as no less than this share of the peak before it
/// \[choice\]: three times an ember bed is not yet a fire.
const SMALLEST_LEVEL: f64 = 0.02;

/// A later peak counts from this factor above the heat release when its stage
/// began \[choice\].
const PEAK_GROWTH: f64 = 1.2;

/// A peak counts from this share of the highest peak of the run \[choice\].
const SMALLEST_PEAK: f64 = 0.05;

/// A peak after an action counts from this heat release, W, or from half of
/// the highest one of a small fire \[choice\].
const SMALLEST_LATER_PEAK: f64 = 50e3;

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
        .by_stage(reader.air_ratio(), Side::Below, SHORT_OF_AIR)
        .into_iter()
        .map(|spell| {
            let text = "fire short of air: burns less than half of what it would in the open";
            let back = spell.end.and_then(|end| reader.back_at(end, SHORT_OF_AIR));
            reader
                .moment(
                    spell.start,
                    Kind::ShortOfAir,
                    Subject::House,
                    text.to_owned(),
                )
                .with(
                    "heat release",
                    reader.burned().at(spell.start),
                    Dimension::Power,
                )
                .with("free rate", reader.free().at(spell.start), Dimension::Power)
                .with_spell(spell)
                .with(
                    "at half of the free rate again",
                    back.unwrap_or(f64::NAN),
                    Dimension::Time,
                )
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
                    "heat release",
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

/// One peak for each stage between actions; a rise that an action does not
/// stop counts with the stage in which it ends.
fn peaks(reader: &Reader<'_>) -> Vec<Moment> {
    let release = reader.burned();
    let highest = release
        .largest(0.0, reader.end)
        .map_or(0.0, |(_, value)| value);
    let stages = stages(reader);
    let mut base: Option<f64> = None;
    let mut out = Vec::new();
    for (number, &(from, to)) in stages.iter().enumerate() {
        let Some((time, value)) = release.largest(from, to) else {
            continue;
        };
        let at_start = release.at(from);
        let lowest = base.take().map_or(at_start, |base| base.min(at_start));
        let goes_on = stages
            .get(number + 1)
            .and_then(|&(from, to)| release.largest(from, to))
            .is_some_and(|(_, later)| time >= to && later > value);
        if goes_on {
            base = Some(lowest);
            continue;
        }
        let counts = if number == 0 {
            value > SMALLEST_PEAK * highest
        } else {
            value > PEAK_GROWTH * lowest && value > SMALLEST_LATER_PEAK.min(0.5 * highest)
        };
        if counts && time > 0.0 && time < reader.end {
            out.push(peak(reader, number, time, value));
        }
    }
    out
}

/// The highest heat release of a stage.
fn peak(reader: &Reader<'_>, stage: usize, time: f64, value: f64) -> Moment {
    let text = match stage {
        _ if reader.played.is_empty() => "highest heat release",
        0 => "highest heat release before anything is changed",
        _ => "highest heat release after that",
    };
    reader
        .moment(time, Kind::Peak, Subject::House, text.to_owned())
        .with("heat release", value, Dimension::Power)
        .within(reader.band(time))
}

/// What the fire released before an opening, W, when it was short of air then.
pub(super) fn starved_level(reader: &Reader<'_>, opening: f64) -> Option<f64> {
    let ratio = reader.burned_over_free();
    let mean = reader.burned().mean(opening - LEVEL_TIME, opening);
    let level = mean.min(reader.burned().at(opening));
    let short = ratio.at(opening) < SHORT_OF_AIR
        || ratio.mean(opening - LEVEL_TIME, opening) < SHORT_OF_AIR;
    let peak = reader.burned().largest(0.0, opening)?.1;
    (short && level.is_finite()).then(|| level.max(SMALLEST_LEVEL * peak))
}

/// By what a fire counts as back.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum BackBy {
    /// Heat release above three times the starved level.
    StarvedLevel,
    /// Heat release above the peak before the opening, which is the smaller.
    EarlierPeak,
    /// A room is near flashover again: its layer at 500 °C.
    NearFlashover,
}

impl BackBy {
    /// In plain words.
    pub fn words(self) -> &'static str {
        match self {
            BackBy::StarvedLevel => "back above three times its starved level",
            BackBy::EarlierPeak => "back above its earlier peak",
            BackBy::NearFlashover => "back: a room is near flashover again",
        }
    }
}

/// A fire that is back after an opening.
#[derive(Debug, Clone, Copy)]
pub(super) struct Back {
    /// When, s.
    pub time: f64,
    /// By what.
    pub by: BackBy,
    /// Its starved level, W.
    level: f64,
}

/// When and by what the fire is back between an opening and a later time.
fn back_after(reader: &Reader<'_>, from: f64, to: f64) -> Option<Back> {
    let level = starved_level(reader, from)?;
    let peak = reader.burned().largest(0.0, from)?.1;
    let (by, needed) = if peak < BACK_UP * level {
        (BackBy::EarlierPeak, peak)
    } else {
        (BackBy::StarvedLevel, BACK_UP * level)
    };
    let first = |history: History<'_>, threshold: f64| {
        let spells = history.spells(Side::Above, threshold);
        let mut starts = spells.into_iter().map(|spell| spell.start);
        starts.find(|&start| start > from && start <= to)
    };
    let by_release = first(reader.burned(), needed).map(|time| Back { time, by, level });
    let rooms = 0..reader.plan.rooms.len();
    let near = rooms
        .filter_map(|room| {
            let layer = reader.history(Subject::Room(room), Quantity::UpperTemperature);
            first(layer, flashover::LAYER_NEAR)
        })
        .reduce(f64::min)
        .map(|time| Back {
            time,
            by: BackBy::NearFlashover,
            level,
        });
    match (by_release, near) {
        (Some(release), Some(near)) if near.time < release.time => Some(near),
        (release, near) => release.or(near),
    }
}

/// Fires that come back, once after each opening on a fire short of air.
pub(super) fn backs(reader: &Reader<'_>) -> Vec<Back> {
    let openings: Vec<_> = reader.played.iter().filter(|p| p.opens()).collect();
    let mut out = Vec::new();
    for (number, opening) in openings.iter().enumerate() {
        // A later opening on a fire that is back already does not end the wait.
        let to = openings[number + 1..]
            .iter()
            .find(|next| starved_level(reader, next.time).is_some())
            .map_or(reader.end, |next| next.time);
        out.extend(back_after(reader, opening.time, to));
    }
    out
}

fn back_up(reader: &Reader<'_>) -> Vec<Moment> {
    backs(reader)
        .into_iter()
        .map(|back| {
            let text = format!("fire comes {}", back.by.words());
            let release = reader.burned().at(back.time);
            reader
                .moment(back.time, Kind::BackUp, Subject::House, text)
                .with("heat release", release, Dimension::Power)
                .with("starved level", back.level, Dimension::Power)
                .within(reader.band(back.time))
                .weighing(Weight::Headline)
        })
        .collect()
}

/// What a fire that does not count as back did after an opening.
pub(super) fn comeback(reader: &Reader<'_>, opened: f64) -> Option<Comeback> {
    let level = starved_level(reader, opened)?;
    if let Some(back) = backs(reader).into_iter().next() {
        return Some(Comeback::At {
            time: back.time,
            by: back.by,
            band: reader.band(back.time),
        });
    }
    let from = reader.burned().at(opened);
    let (time, value) = reader.burned().largest(opened, reader.end)?;
    if value <= PEAK_GROWTH * from || value < SMALLEST_LATER_PEAK {
        return Some(Comeback::NotInTheModel);
    }
    let shut = reader
        .played
        .iter()
        .find(|p| p.time >= opened && p.narrows());
    Some(Comeback::Grew {
        from,
        to: Extreme { value, time },
        level,
        narrowed: shut.map(|played| Narrowed {
            opening: played
                .opening()
                .and_then(|index| reader.plan.openings.get(index))
                .map_or_else(String::new, |opening| opening.name.clone()),
            shut: played.after().is_some_and(|after| after <= 0.0),
            time: played.time,
        }),
    })
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
