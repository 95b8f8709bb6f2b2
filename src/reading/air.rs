//! Cold air on its way from an opening to the seat of the fire: its front at
//! the earliest, and when the fire feels it.

use std::collections::VecDeque;

use super::fire::burned_out_at;
use super::moment::{Kind, Moment, spoken};
use super::reader::{Played, Reader};
use crate::physics::cold_front;
use crate::plan::{OpeningKind, Plan, Space};
use crate::record::{Dimension, Quantity, Subject};

/// Rise of the oxygen at the flame base at which the fire feels the air:
/// one percentage point \[choice\]. Half of the way to the later maximum would
/// wait for the fire to burn out.
const FELT_RISE: f64 = 0.01;

/// Speed of the front in a room, m/s: the gas's own temperature (K) against the
/// open air's. Densities go as 1/T; only their ratio counts.
fn front_speed(kind: OpeningKind, cold: f64, gas: f64, height: f64) -> f64 {
    let froude = match kind {
        OpeningKind::Door | OpeningKind::Division => cold_front::FROUDE_DOOR,
        OpeningKind::Window | OpeningKind::Gap | OpeningKind::Hatch | OpeningKind::Stair => {
            cold_front::FROUDE_SLOT
        }
    };
    cold_front::speed(froude, 1.0 / cold, 1.0 / gas, height)
}

/// Both moments for every action that opens a way in for cold air.
pub(super) fn moments(reader: &Reader<'_>) -> Vec<Moment> {
    let Some(item) = reader.main_item() else {
        return Vec::new();
    };
    let mut out = Vec::new();
    let lit = reader
        .plan
        .items
        .get(item)
        .map_or(f64::INFINITY, |item| item.ignition);
    let gone = burned_out_at(reader, item).unwrap_or(f64::INFINITY);
    for (number, played) in reader.played.iter().enumerate() {
        let opened = played.time;
        if !played.opens() || opened < lit || opened > gone {
            continue;
        }
        let next = reader.played.get(number + 1).map_or(reader.end, |p| p.time);
        out.extend(front(reader, item, number, played));
        out.extend(felt(reader, item, played, next));
    }
    out
}

/// Arrival of the front from an opening to the open air.
fn front(reader: &Reader<'_>, item: usize, number: usize, played: &Played<'_>) -> Option<Moment> {
    let plan = reader.plan;
    let index = played.opening()?;
    let opening = plan.openings.get(index)?;
    if opening.kind.is_horizontal() {
        return None;
    }
    let first = match (opening.from, opening.to) {
        (Space::Room(room), Space::OpenAir) | (Space::OpenAir, Space::Room(room)) => room.0,
        _ => return None,
    };
    let seat = plan.items.get(item)?.room.0;
    let way = way(plan, &widths_after(reader, number), first, seat)?;
    let opened = played.time;
    let (mut delay, mut path) = (0.0, 0.0);
    for (step, &room) in way.rooms.iter().enumerate() {
        let gas = reader
            .history(Subject::Room(room), Quantity::MeanTemperature)
            .at(opened);
        let height = plan.rooms.get(room)?.height;
        let speed = front_speed(opening.kind, plan.open_air.temperature, gas, height);
        if speed <= 0.0 || speed.is_nan() {
            return None;
        }
        let entry = if step == 0 {
            Some(index)
        } else {
            way.openings.get(step - 1).copied()
        };
        let exit = way.openings.get(step).copied();
        let length = crossing_length(plan, room, entry, exit, item)?;
        path += length;
        delay += length / speed;
    }
    let name = spoken(&opening.name);
    let text = format!("cold air from the {name} reaches the fire, at the earliest");
    let arrival = opened + delay;
    (arrival <= reader.end).then(|| {
        reader
            .moment(arrival, Kind::AirEarliest, Subject::Opening(index), text)
            .with("distance", path, Dimension::Length)
            .with("speed of the front", path / delay, Dimension::Speed)
    })
}

/// When the oxygen at the flame base has risen, before the next action.
fn felt(reader: &Reader<'_>, item: usize, played: &Played<'_>, next: f64) -> Option<Moment> {
    let opened = played.time;
    let subject = Subject::Item(item);
    let base = reader.history(subject, Quantity::BaseOxygen);
    let before = base.at(opened);
    let spell = base
        .spells(super::history::Side::Above, before + FELT_RISE)
        .into_iter()
        .find(|spell| spell.start > opened && spell.start <= next)?;
    let text = "fire feels the air: oxygen at the flame base up by one point";
    Some(
        reader
            .moment(spell.start, Kind::AirFelt, subject, text.to_owned())
            .with(
                "oxygen at the flame base",
                before + FELT_RISE,
                Dimension::VolumeFraction,
            )
            .with("at the opening", before, Dimension::VolumeFraction)
            .within(reader.band(spell.start)),
    )
}

/// Clear widths of all openings once an action is done, m.
fn widths_after(reader: &Reader<'_>, number: usize) -> Vec<f64> {
    let mut widths: Vec<f64> = reader.plan.openings.iter().map(|o| o.clear_width).collect();
    for played in reader.played.iter().take(number + 1) {
        if let (Some(opening), Some(after)) = (played.opening(), played.after())
            && let Some(width) = widths.get_mut(opening)
        {
            *width = after;
        }
    }
    widths
}

/// Rooms on the way and the openings between them.
struct Way {
    rooms: Vec<usize>,
    openings: Vec<usize>,
}

/// Way with the fewest rooms through open doors from one room to another.
fn way(plan: &Plan, widths: &[f64], first: usize, last: usize) -> Option<Way> {
    let count = plan.rooms.len();
    if first >= count || last >= count {
        return None;
    }
    let mut came: Vec<Option<(usize, usize)>> = vec![None; count];
    let mut seen = vec![false; count];
    seen[first] = true;
    let mut queue = VecDeque::from([first]);
    while let Some(room) = queue.pop_front() {
        for (index, opening) in plan.openings.iter().enumerate() {
            let (Space::Room(a), Space::Room(b)) = (opening.from, opening.to) else {
                continue;
            };
            let walked = matches!(opening.kind, OpeningKind::Door | OpeningKind::Division);
            let open = walked && widths.get(index).is_some_and(|w| *w > 0.0);
            let next = match room {
                _ if !open => continue,
                room if room == a.0 => b.0,
                room if room == b.0 => a.0,
                _ => continue,
            };
            if next < count && !seen[next] {
                seen[next] = true;
                came[next] = Some((room, index));
                queue.push_back(next);
            }
        }
    }
    let mut rooms = vec![last];
    let mut openings = Vec::new();
    let mut at = last;
    while at != first {
        let (before, opening) = came[at]?;
        rooms.push(before);
        openings.push(opening);
        at = before;
    }
    rooms.reverse();
    openings.reverse();
    Some(Way { rooms, openings })
}

/// Length of the way through one room, m: between the stated places of its
/// ends, else the longer side of a room that is passed through and half of it
/// in the room of the fire.
fn crossing_length(
    plan: &Plan,
    room: usize,
    entry: Option<usize>,
    exit: Option<usize>,
    item: usize,
) -> Option<f64> {
    let sides = plan.rooms.get(room)?;
    let longer = sides.width.max(sides.length);
    let place = |opening: usize| {
        let opening = plan.openings.get(opening)?;
        match opening.from {
            Space::Room(id) if id.0 == room => opening.at,
            _ => None,
        }
    };
    let start = entry.and_then(place);
    let (end, default) = match exit {
        Some(exit) => (place(exit), longer),
        None => (plan.items.get(item).and_then(|item| item.at), 0.5 * longer),
    };
    Some(match (start, end) {
        (Some([x0, y0]), Some([x1, y1])) => (x1 - x0).hypot(y1 - y0),
        _ => default,
    })
}
