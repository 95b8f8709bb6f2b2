//! The run in a few numbers.

use serde::Serialize;

use super::fire::{self, BackBy, SHORT_OF_AIR};
use super::flashover::{self, Flashover};
use super::history::Side;
use super::moment::{Band, Kind};
use super::reader::Reader;
use super::rooms;
use super::stations;
use super::ways::{self, FlowSummary};
use crate::record::{Closure, Dimension, Ended, Quantity, Subject};

/// Rise of the layer temperature from which it counts, K \[choice\].
const WARMED: f64 = 10.0;

/// Share of the height below which a smoke level counts \[choice\].
const FILLED: f64 = 0.95;

/// A value and when it occurs.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Extreme {
    /// Value, SI.
    pub value: f64,
    /// When, s from ignition.
    pub time: f64,
}

/// A stretch of time.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Stretch {
    /// From, s.
    pub from: f64,
    /// To, s; `None` when it lasts to the end of the record.
    pub to: Option<f64>,
}

/// A stretch of time short of air.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ShortOfAir {
    /// From, s.
    pub from: f64,
    /// To, s; `None` when it lasts to the end of the record.
    pub to: Option<f64>,
    /// True when it ends because the incoming air could burn more than the
    /// free rate, with the fire still below half of that.
    pub has_air_again: bool,
    /// When the fire is then back at half of its free rate, s; `None` when it
    /// is so at once or not within the record.
    pub half_again: Option<f64>,
}

/// A room in a few numbers.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RoomSummary {
    /// Name in the scenario.
    pub name: String,
    /// False when no warm smoke layer worth the name forms: never below 95 % of
    /// the height, or never 10 K warmer than at the start \[choice\].
    pub hot_layer: bool,
    /// Hottest upper layer, K.
    pub hottest_layer: Option<Extreme>,
    /// Lowest smoke level, m above the floor.
    pub lowest_smoke_level: Option<Extreme>,
    /// When the smoke reached to the floor: the lower layer smoky itself.
    pub smoke_to_floor: Vec<Stretch>,
    /// When momentum mixed it.
    pub mixed: Vec<Stretch>,
    /// Flashover before the first opening, or over the whole run without one.
    pub flashover_before: Option<Flashover>,
    /// Flashover from the first opening on.
    pub flashover_after: Option<Flashover>,
}

/// A limit at a station and when it is reached.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct LimitSummary {
    /// Which limit.
    pub kind: Kind,
    /// In plain words.
    pub words: &'static str,
    /// The limit, SI.
    pub limit: f64,
    /// Its dimension.
    pub dimension: Dimension,
    /// First time, s; `None` when it is not reached in the model.
    pub first: Option<f64>,
    /// First time at or after the first opening, s; the opening's own time
    /// when it was reached before and still is.
    pub first_after_opening: Option<f64>,
    /// Earliest and latest to expect of that, unless it was so at the opening.
    pub band: Option<Band>,
}

/// The worst value of a quantity at a station.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Worst {
    /// What.
    pub quantity: Quantity,
    /// Value and time.
    pub extreme: Extreme,
}

/// A station in a few numbers.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct StationSummary {
    /// Name in the scenario.
    pub name: String,
    /// Room.
    pub room: String,
    /// Posture in words.
    pub posture: String,
    /// Head height, m.
    pub height: f64,
    /// Worst values.
    pub worst: Vec<Worst>,
    /// Limits.
    pub limits: Vec<LimitSummary>,
}

/// The first action that makes an opening wider after ignition.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct FirstOpening {
    /// Name of the action.
    pub action: String,
    /// Time, s.
    pub time: f64,
}

/// What the fire does after the first opening.
#[derive(Debug, Clone, PartialEq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Comeback {
    /// It was short of air and comes back: above three times its starved
    /// level, above its earlier peak, or with a room near flashover again.
    At {
        /// When, s.
        time: f64,
        /// By what.
        by: BackBy,
        /// Earliest and latest to expect.
        band: Option<Band>,
    },
    /// It was short of air and grows after the opening, but not as far as that.
    Grew {
        /// Heat release at the opening, W.
        from: f64,
        /// Highest heat release after it, W.
        to: Extreme,
        /// Its starved level, W.
        level: f64,
        /// The first opening that was made narrower on the way.
        narrowed: Option<Narrowed>,
    },
    /// It was short of air and does not come back within the run.
    NotInTheModel,
}

/// An opening that was shut or made narrower.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Narrowed {
    /// Name of the opening.
    pub opening: String,
    /// True when nothing stays open.
    pub shut: bool,
    /// When, s.
    pub time: f64,
}

/// Relative closures of the ledger.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Closures {
    /// Mass, of what went through.
    pub mass: f64,
    /// Energy, of the heat released.
    pub energy: f64,
    /// Oxygen, of what went through.
    pub oxygen: f64,
    /// Carbon, of what went through.
    pub carbon: f64,
}

/// The run in a few numbers.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Summary {
    /// Last time of the record, s.
    pub end: f64,
    /// How the run ended.
    pub ended: Ended,
    /// The first opening on the fire, if any.
    pub first_opening: Option<FirstOpening>,
    /// Highest heat burned before the first opening, or over the whole run
    /// without one, W.
    pub peak_before: Option<Extreme>,
    /// Lowest heat burned between that peak and the first opening, W.
    pub lowest_before: Option<Extreme>,
    /// Whether the fire comes back; `None` without an opening on a fire short
    /// of air.
    pub comeback: Option<Comeback>,
    /// Highest heat burned from the first opening on, W.
    pub peak_after: Option<Extreme>,
    /// The most that the incoming air could burn in the 30 s before it burned
    /// most after the opening, W; `None` when an opening was narrowed in them.
    pub air_could_burn_at_peak: Option<f64>,
    /// Lowest oxygen at the base of the main item's flame, wet volume fraction.
    pub lowest_base_oxygen: Option<Extreme>,
    /// When the fire was short of air.
    pub short_of_air: Vec<ShortOfAir>,
    /// Highest size of the pressure in any room, Pa.
    pub highest_pressure: Option<Extreme>,
    /// Rooms, in the order of the scenario.
    pub rooms: Vec<RoomSummary>,
    /// Flow through openings, in the order of the scenario.
    pub flow: Vec<FlowSummary>,
    /// Stations, in the order of the scenario.
    pub stations: Vec<StationSummary>,
    /// Closures of the ledger.
    pub closures: Closures,
    /// Number of things that a user should know about the run.
    pub flags: usize,
    /// What should be known with every reading of this run, in words.
    pub notes: Vec<&'static str>,
}

/// How long before its peak a fire may have breathed what it burns then, s
/// \[choice\].
const BREATHED: f64 = 30.0;

/// Said of carbon monoxide when the fire was short of air (`docs/method.md`,
/// 24).
const CARBON_MONOXIDE: &str = "CO is reckoned with the yield of a fire with plenty of air; \
    short of air it can be ten times higher. Read every CO as \"at least\".";

/// What holds for all readings of this run.
fn notes(reader: &Reader<'_>) -> Vec<&'static str> {
    if short_of_air(reader).is_empty() {
        Vec::new()
    } else {
        vec![CARBON_MONOXIDE]
    }
}

/// The most that the incoming air could burn shortly before the peak, W.
fn air_at_peak(reader: &Reader<'_>, peak: f64, opened: f64) -> Option<f64> {
    let from = (peak - BREATHED).max(opened);
    let narrowed = |played: &super::played::Played<'_>| {
        played.narrows() && played.time >= from && played.time <= peak
    };
    if reader.played.iter().any(narrowed) {
        return None;
    }
    let air = reader.history(Subject::House, Quantity::AirCouldBurn);
    air.largest(from, peak).map(|(_, value)| value)
}

/// Reads the summary.
pub(super) fn read(reader: &Reader<'_>) -> Summary {
    let first_opening = first_opening(reader);
    let opened = first_opening.as_ref().map(|first| first.time);
    let before_end = opened.unwrap_or(reader.end);
    let burned = reader.burned();
    let peak_before = extreme(burned.largest(0.0, before_end));
    let peak_after = opened.and_then(|opened| extreme(burned.largest(opened, reader.end)));
    let ledger = &reader.record.ledger;
    let relative = |closure: &Closure| closure.relative;
    Summary {
        end: reader.end,
        ended: reader.record.ended.clone(),
        peak_before,
        lowest_before: opened
            .zip(peak_before)
            .and_then(|(opened, peak)| extreme(burned.smallest(peak.time, opened))),
        comeback: opened.and_then(|opened| fire::comeback(reader, opened)),
        peak_after,
        air_could_burn_at_peak: peak_after
            .zip(opened)
            .and_then(|(peak, opened)| air_at_peak(reader, peak.time, opened)),
        notes: notes(reader),
        lowest_base_oxygen: lowest_base_oxygen(reader),
        short_of_air: short_of_air(reader),
        highest_pressure: highest_pressure(reader),
        rooms: (0..reader.plan.rooms.len())
            .map(|room| room_summary(reader, room, opened))
            .collect(),
        flow: ways::summary(reader),
        stations: (0..reader.plan.stations.len())
            .filter_map(|station| station_summary(reader, station, opened))
            .collect(),
        closures: Closures {
            mass: relative(&ledger.mass),
            energy: relative(&ledger.energy),
            oxygen: relative(&ledger.oxygen),
            carbon: relative(&ledger.carbon),
        },
        flags: reader.record.flags.len(),
        first_opening,
    }
}

fn extreme(found: Option<(f64, f64)>) -> Option<Extreme> {
    found.map(|(time, value)| Extreme { value, time })
}

/// First opening at or after the first ignition.
fn first_opening(reader: &Reader<'_>) -> Option<FirstOpening> {
    let lit = reader.plan.items.iter().map(|item| item.ignition);
    let lit = lit.fold(f64::INFINITY, f64::min);
    reader
        .played
        .iter()
        .find(|played| played.opens() && played.time > lit)
        .map(|played| FirstOpening {
            action: played.name.to_owned(),
            time: played.time,
        })
}

fn lowest_base_oxygen(reader: &Reader<'_>) -> Option<Extreme> {
    let item = reader.main_item()?;
    let base = reader.history(Subject::Item(item), Quantity::BaseOxygen);
    extreme(base.smallest(0.0, reader.end))
}

fn short_of_air(reader: &Reader<'_>) -> Vec<ShortOfAir> {
    reader
        .air_ratio()
        .spells(Side::Below, SHORT_OF_AIR)
        .into_iter()
        .map(|spell| ShortOfAir {
            from: spell.start,
            to: spell.end,
            has_air_again: spell
                .end
                .is_some_and(|end| reader.back_at(end, SHORT_OF_AIR).is_some()),
            half_again: spell
                .end
                .and_then(|end| reader.back_at(end, SHORT_OF_AIR))
                .filter(|time| time.is_finite()),
        })
        .collect()
}

fn highest_pressure(reader: &Reader<'_>) -> Option<Extreme> {
    (0..reader.plan.rooms.len())
        .flat_map(|room| {
            let pressure = reader.history(Subject::Room(room), Quantity::Pressure);
            [
                pressure.largest(0.0, reader.end),
                pressure.smallest(0.0, reader.end),
            ]
        })
        .filter_map(extreme)
        .max_by(|a, b| a.value.abs().total_cmp(&b.value.abs()))
}

fn room_summary(reader: &Reader<'_>, room: usize, opened: Option<f64>) -> RoomSummary {
    let subject = Subject::Room(room);
    let layer = reader.history(subject, Quantity::UpperTemperature);
    let level = reader.history(subject, Quantity::Interface);
    let lowest = level.smallest(0.0, reader.end);
    let hottest = layer.largest(0.0, reader.end);
    let plan_room = reader.plan.rooms.get(room);
    let filled = lowest
        .zip(plan_room)
        .is_none_or(|((_, lowest), room)| lowest < FILLED * room.height);
    let warmed = hottest
        .zip(plan_room)
        .is_none_or(|((_, hottest), room)| hottest > room.temperature + WARMED);
    RoomSummary {
        hot_layer: filled && warmed,
        name: reader
            .plan
            .rooms
            .get(room)
            .map_or_else(String::new, |r| r.name.clone()),
        hottest_layer: extreme(hottest),
        lowest_smoke_level: extreme(lowest),
        smoke_to_floor: rooms::smoke_to_floor_stretches(reader, room),
        mixed: ways::mixed_stretches(reader, room),
        flashover_before: flashover::read(reader, room, 0.0, opened.unwrap_or(reader.end)),
        flashover_after: opened
            .and_then(|opened| flashover::read(reader, room, opened, reader.end)),
    }
}

fn station_summary(
    reader: &Reader<'_>,
    index: usize,
    opened: Option<f64>,
) -> Option<StationSummary> {
    let station = reader.plan.stations.get(index)?;
    let subject = Subject::Station(index);
    let worst = [
        (Quantity::StationTemperature, Side::Above),
        (Quantity::StationFlux, Side::Above),
        (Quantity::StationOxygen, Side::Below),
        (Quantity::StationCarbonMonoxide, Side::Above),
        (Quantity::StationCarbonDioxide, Side::Above),
        (Quantity::StationVisibility, Side::Below),
    ];
    let worst = worst.into_iter().filter_map(|(quantity, side)| {
        let history = reader.history(subject, quantity);
        let found = match side {
            Side::Above => history.largest(0.0, reader.end),
            Side::Below => history.smallest(0.0, reader.end),
        };
        extreme(found).map(|extreme| Worst { quantity, extreme })
    });
    Some(StationSummary {
        name: station.name.clone(),
        room: reader
            .plan
            .rooms
            .get(station.room.0)
            .map_or_else(String::new, |r| r.name.clone()),
        posture: station.posture.clone(),
        height: station.height,
        worst: worst.collect(),
        limits: stations::limits(station)
            .into_iter()
            .map(|limit| limit_summary(reader, subject, limit, opened))
            .collect(),
    })
}

fn limit_summary(
    reader: &Reader<'_>,
    subject: Subject,
    limit: stations::Limit,
    opened: Option<f64>,
) -> LimitSummary {
    let history = reader.history(subject, limit.quantity);
    let spells = history.spells(limit.side, limit.value);
    let after = |opened: f64| {
        spells
            .iter()
            .find(|spell| spell.end.is_none_or(|end| end > opened))
            .map(|spell| spell.start.max(opened))
    };
    let first_after_opening = opened.and_then(after);
    LimitSummary {
        kind: limit.kind,
        words: limit.words,
        limit: limit.value,
        dimension: limit.quantity.dimension(),
        first: spells.first().map(|spell| spell.start),
        first_after_opening,
        band: first_after_opening.and_then(|time| reader.band(time)),
    }
}
