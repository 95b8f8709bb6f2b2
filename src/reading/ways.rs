//! Which way gas goes through openings, rooms that momentum mixes, and flame
//! out of openings.

use serde::Serialize;

use super::history::{History, Side, Spell};
use super::moment::{Kind, Moment, Weight, spoken};
use super::reader::Reader;
use super::summary::{Extreme, Stretch};
use crate::plan::{Opening, OpeningKind, Space};
use crate::record::{Dimension, Quantity, Subject};

/// Flows below this have no direction worth telling, kg/s \[choice\]: about
/// twice what a shut door leaks in a fire.
const SMALLEST_FLOW: f64 = 0.2;

/// Clear width from which an opening counts as open, m \[choice\].
const AJAR: f64 = 0.01;

/// Rise of the mean of the gas from which mixing is told, K \[choice\]: in cold
/// rooms there are no layers to mix.
const WARM: f64 = 20.0;

/// Excess of one direction over the other, of their sum, from which the flow
/// counts as one-way \[choice\]: less than a fiftieth goes back.
const ONE_WAY: f64 = 0.96;

/// Share from which a room counts as mixed by momentum \[choice\].
const MIXED: f64 = 0.5;

/// Flame above the head of an opening from which it is told, m \[choice\].
const SHORTEST_FLAME: f64 = 0.1;

/// Which way gas goes through an opening, as people there would say it.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct FlowSummary {
    /// Name of the opening.
    pub name: String,
    /// Words for the forward direction ("out", "to hall").
    pub forward: String,
    /// Words for the backward direction ("in", "to bedroom").
    pub backward: String,
    /// Strongest forward flow, kg/s.
    pub strongest_forward: Extreme,
    /// Strongest backward flow, kg/s.
    pub strongest_backward: Extreme,
    /// When all of it went forward.
    pub only_forward: Vec<Stretch>,
    /// When all of it went backward.
    pub only_backward: Vec<Stretch>,
    /// Longest flame above its head outside, m.
    pub longest_flame: Option<Extreme>,
}

/// Words for both directions of an opening.
fn words(reader: &Reader<'_>, opening: &Opening) -> [String; 2] {
    match (opening.from, opening.to) {
        (_, Space::OpenAir) => ["out".to_owned(), "in".to_owned()],
        (Space::OpenAir, _) => ["in".to_owned(), "out".to_owned()],
        (Space::Room(from), Space::Room(to)) => {
            [to, from].map(|room| format!("to {}", reader.room_name(room.0)))
        }
    }
}

/// Openings whose flow is told: all but gaps.
fn told<'a>(reader: &'a Reader<'_>) -> impl Iterator<Item = (usize, &'a Opening)> {
    reader
        .plan
        .openings
        .iter()
        .enumerate()
        .filter(|(_, opening)| opening.kind != OpeningKind::Gap)
}

/// Excess of the forward flow over the backward one, of their sum; zero where
/// little flows or the opening is shut.
fn excess(reader: &Reader<'_>, index: usize) -> Vec<f64> {
    let of = |quantity| reader.record.get(Subject::Opening(index), quantity);
    of(Quantity::FlowForward)
        .iter()
        .zip(of(Quantity::FlowBackward))
        .zip(of(Quantity::ClearWidth))
        .map(|((forward, backward), clear)| {
            let sum = forward + backward;
            if sum >= SMALLEST_FLOW && *clear >= AJAR {
                (forward - backward) / sum
            } else {
                0.0
            }
        })
        .collect()
}

/// All moments of flow, mixing and flame outside.
pub(super) fn moments(reader: &Reader<'_>) -> Vec<Moment> {
    let mut out = Vec::new();
    for (index, opening) in told(reader) {
        out.extend(turns(reader, index, opening));
        out.extend(flames(reader, index, opening));
    }
    for room in 0..reader.plan.rooms.len() {
        out.extend(mixed(reader, room));
    }
    out
}

/// Flow that turns one-way, and back.
fn turns(reader: &Reader<'_>, index: usize, opening: &Opening) -> Vec<Moment> {
    let excess = excess(reader, index);
    let history = History::new(&reader.record.time, &excess);
    let subject = Subject::Opening(index);
    let name = spoken(&opening.name);
    let mut out = Vec::new();
    let weight = if matters(reader, opening) {
        Weight::Plain
    } else {
        Weight::Detail
    };
    let sides = [(Side::Above, ONE_WAY), (Side::Below, -ONE_WAY)];
    for ((side, threshold), way) in sides.into_iter().zip(words(reader, opening)) {
        for spell in reader.by_stage(history, side, threshold) {
            let text = format!("{name}: flow turns one-way, all of it {way}");
            out.push(
                state(reader, spell.start, Kind::OneWay, index, text)
                    .with_spell(spell)
                    .weighing(weight),
            );
            let end = spell.end.filter(|end| {
                // Ending because little flows any more is no turn.
                let later = reader.history(subject, Quantity::FlowForward).at(end + 1.0)
                    + reader
                        .history(subject, Quantity::FlowBackward)
                        .at(end + 1.0);
                later >= SMALLEST_FLOW && spell.times == 1
            });
            if let Some(end) = end {
                let text = format!("{name}: flow goes both ways again");
                out.push(state(reader, end, Kind::TwoWay, index, text).weighing(Weight::Detail));
            }
        }
    }
    out
}

/// Whether an opening is one of the building's ends, of the fire's room or of
/// people's.
fn matters(reader: &Reader<'_>, opening: &Opening) -> bool {
    let plan = reader.plan;
    [opening.from, opening.to]
        .into_iter()
        .any(|side| match side {
            Space::OpenAir => true,
            Space::Room(room) => {
                plan.items.iter().any(|item| item.room == room)
                    || plan.stations.iter().any(|station| station.room == room)
            }
        })
}

/// A moment of an opening with flows and temperatures.
fn state(reader: &Reader<'_>, time: f64, kind: Kind, index: usize, text: String) -> Moment {
    let subject = Subject::Opening(index);
    let at = |quantity| reader.history(subject, quantity).at(time);
    let forward = at(Quantity::FlowForward) >= at(Quantity::FlowBackward);
    let (flow, speed, temperature) = if forward {
        (
            at(Quantity::FlowForward),
            at(Quantity::SpeedForward),
            at(Quantity::TemperatureForward),
        )
    } else {
        // The record has no temperature of the gas coming back.
        (
            at(Quantity::FlowBackward),
            at(Quantity::SpeedBackward),
            f64::NAN,
        )
    };
    reader
        .moment(time, kind, subject, text)
        .with("flow", flow, Dimension::MassFlow)
        .with("speed", speed, Dimension::Speed)
        .with("gas", temperature, Dimension::Temperature)
}

/// Flame out of an opening to the open air.
fn flames(reader: &Reader<'_>, index: usize, opening: &Opening) -> Vec<Moment> {
    let subject = Subject::Opening(index);
    let flame = reader.history(subject, Quantity::OutsideFlame);
    let name = spoken(&opening.name);
    reader
        .by_stage(flame, Side::Above, SHORTEST_FLAME)
        .into_iter()
        .map(|spell| {
            let end = spell.end.unwrap_or(reader.end);
            let longest = flame.largest(spell.start, end);
            let burned = reader.history(subject, Quantity::BurnedOutside);
            let (time, height) = longest.unwrap_or((spell.start, f64::NAN));
            let text = format!("flame out of the {name}, above its head");
            reader
                .moment(spell.start, Kind::FlameOutside, subject, text)
                .with("longest above the head", height, Dimension::Length)
                .with("burned outside then", burned.at(time), Dimension::Power)
                .with_spell(spell)
                .weighing(Weight::Headline)
        })
        .collect()
}

/// Rooms that momentum mixes.
fn mixed(reader: &Reader<'_>, room: usize) -> Vec<Moment> {
    let subject = Subject::Room(room);
    let share = mixed_share(reader, room);
    let history = History::new(&reader.record.time, &share);
    let name = reader.room_name(room);
    reader
        .by_stage(history, Side::Above, MIXED)
        .into_iter()
        .map(|spell| {
            let mean = reader.history(subject, Quantity::MeanTemperature);
            let text = format!("{name}: mixed by momentum, no cool layer to stay low in");
            reader
                .moment(spell.start, Kind::Mixed, subject, text)
                .with(
                    "mean of the gas",
                    mean.at(spell.start),
                    Dimension::Temperature,
                )
                .with_spell(spell)
                .weighing(Weight::Headline)
        })
        .collect()
}

/// When momentum mixes a room.
pub(super) fn mixed_stretches(reader: &Reader<'_>, room: usize) -> Vec<Stretch> {
    let share = mixed_share(reader, room);
    stretches(History::new(&reader.record.time, &share).spells(Side::Above, MIXED))
}

/// How far momentum mixes a room, zero while it is cold.
fn mixed_share(reader: &Reader<'_>, room: usize) -> Vec<f64> {
    let of = |quantity| reader.record.get(Subject::Room(room), quantity);
    let start = reader.plan.rooms.get(room).map_or(0.0, |r| r.temperature);
    of(Quantity::MixedShare)
        .iter()
        .zip(of(Quantity::MeanTemperature))
        .map(|(share, mean)| if *mean > start + WARM { *share } else { 0.0 })
        .collect()
}

fn stretches(spells: Vec<Spell>) -> Vec<Stretch> {
    spells
        .into_iter()
        .map(|spell| Stretch {
            from: spell.start,
            to: spell.end,
        })
        .collect()
}

/// Flow through every opening through which something worth telling goes.
pub(super) fn summary(reader: &Reader<'_>) -> Vec<FlowSummary> {
    told(reader)
        .filter_map(|(index, opening)| {
            let subject = Subject::Opening(index);
            let strongest = |quantity| {
                let found = reader.history(subject, quantity).largest(0.0, reader.end);
                found.map(|(time, value)| Extreme { value, time })
            };
            let forward = strongest(Quantity::FlowForward)?;
            let backward = strongest(Quantity::FlowBackward)?;
            let open = reader.history(subject, Quantity::ClearWidth);
            let (_, widest) = open.largest(0.0, reader.end)?;
            if forward.value.max(backward.value) < SMALLEST_FLOW || widest < AJAR {
                return None;
            }
            let excess = excess(reader, index);
            let history = History::new(&reader.record.time, &excess);
            let [forward_words, backward_words] = words(reader, opening);
            Some(FlowSummary {
                name: opening.name.clone(),
                forward: forward_words,
                backward: backward_words,
                strongest_forward: forward,
                strongest_backward: backward,
                only_forward: stretches(history.spells(Side::Above, ONE_WAY)),
                only_backward: stretches(history.spells(Side::Below, -ONE_WAY)),
                longest_flame: strongest(Quantity::OutsideFlame)
                    .filter(|flame| flame.value >= SHORTEST_FLAME),
            })
        })
        .collect()
}
