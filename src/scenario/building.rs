//! The short reading of a building that `doorglow check` prints.

/// A line; writing to a string cannot fail.
macro_rules! line {
    ($out:expr, $($words:tt)*) => {
        let _ = writeln!($out, $($words)*);
    };
}

mod actions;
mod openings;

use super::resolve::{energy, open_area, stands_open};
use super::{Offered, hand};
use crate::plan::{Burning, Curve, Item, Opening, Plan, RoomId, Space};
use std::fmt::Write as _;

/// Time after ignition at which linings are judged, s.
const LINING_TIME: f64 = 120.0;

/// The building in words and hand figures: rooms, openings and the air they
/// could feed, leakage, fire load, when the fire may run short of air, and
/// bands for flashover. Nothing is run.
pub fn building_text(plan: &Plan) -> String {
    building_and_tactics(plan, &[])
}

/// As [`building_text`], with the tactics that the file offers.
pub fn building_and_tactics(plan: &Plan, offered: &[Offered]) -> String {
    let mut out = String::new();
    rooms(&mut out, plan);
    openings::openings(&mut out, plan);
    openings::wind(&mut out, plan);
    openings::fans(&mut out, plan);
    contents(&mut out, plan);
    stations(&mut out, plan);
    actions::actions(&mut out, plan);
    actions::tactics(&mut out, offered);
    out.push_str(
        "\nHand figures are cross-checks with wide bands; the run does not use them.\n\
         For planning and teaching only, never for decisions at a live incident.\n",
    );
    out
}

fn rooms(out: &mut String, plan: &Plan) {
    line!(out, "{}", plan.title);
    if let Some(tactic) = &plan.tactic {
        line!(out, "tactic: {tactic}");
    }
    line!(
        out,
        "runs {} from ignition; outside {:.0} °C",
        clock(plan.end),
        plan.open_air.temperature - 273.15
    );
    line!(out, "\nROOMS");
    let widest = widest(plan.rooms.iter().map(|room| room.name.as_str()));
    let one_level = plan.rooms.iter().all(|room| room.floor_level == 0.0);
    for room in &plan.rooms {
        let level = if one_level {
            String::new()
        } else {
            format!("  floor at {:+.2} m", room.floor_level)
        };
        line!(
            out,
            "  {:widest$}  {:.2} x {:.2} x {:.2} m  {:5.1} m2  {:6.1} m3{level}",
            room.name,
            room.width,
            room.length,
            room.height,
            room.floor_area(),
            room.volume(),
        );
    }
    let floor: f64 = plan.rooms.iter().map(crate::plan::Room::floor_area).sum();
    let volume: f64 = plan.rooms.iter().map(crate::plan::Room::volume).sum();
    line!(out, "  in all {floor:.1} m2, {volume:.0} m3");
    linings(out, plan);
}

/// Linings of ceiling, walls and floor, rooms alike taken together.
fn linings(out: &mut String, plan: &Plan) {
    let mut groups: Vec<(String, Vec<&str>)> = Vec::new();
    for room in &plan.rooms {
        let words = format!(
            "ceiling {}, walls {}, floor {}",
            room.ceiling.name, room.walls.name, room.floor.name
        );
        match groups.iter_mut().find(|(known, _)| *known == words) {
            Some((_, names)) => names.push(&room.name),
            None => groups.push((words, vec![&room.name])),
        }
    }
    for (words, names) in groups {
        let who = if names.len() == plan.rooms.len() {
            "all rooms".to_owned()
        } else {
            names.join(", ")
        };
        line!(out, "  {who}: {words}");
    }
}

/// Stations and the limits that are watched there.
fn stations(out: &mut String, plan: &Plan) {
    if plan.stations.is_empty() {
        return;
    }
    line!(out, "\nSTATIONS");
    let widest = widest(plan.stations.iter().map(|at| at.name.as_str()));
    for station in &plan.stations {
        let room = plan.rooms.get(station.room.0);
        line!(
            out,
            "  {:widest$}  {}, {}, head at {:.2} m",
            station.name,
            room.map_or("", |room| room.name.as_str()),
            station.posture,
            station.height,
        );
        let limits = &station.limits;
        line!(
            out,
            "    limits: attention {:.0} °C, be out {:.0} °C, oxygen {:.1} %, visibility {:.1} m",
            limits.attention_temperature - 273.15,
            limits.out_temperature - 273.15,
            limits.oxygen * 100.0,
            limits.visibility,
        );
    }
}

fn contents(out: &mut String, plan: &Plan) {
    line!(out, "\nWHAT BURNS");
    if plan.items.is_empty() {
        line!(out, "  nothing");
    }
    for item in &plan.items {
        let (Some(fuel), Some(room)) = (plan.fuels.get(item.fuel.0), plan.rooms.get(item.room.0))
        else {
            continue;
        };
        let heat = energy(item, fuel);
        match &item.burning {
            Burning::Burner { rate, .. } => {
                line!(
                    out,
                    "  {}: burner of {} in {}, {:.0} kW",
                    item.name,
                    fuel.name,
                    room.name,
                    rate / 1e3
                );
            }
            _ => {
                line!(
                    out,
                    "  {}: {:.1} kg of {} in {}\n    {:.0} MJ, peak {:.2} MW in the open; fire load {:.0} MJ per m2 of its room",
                    item.name,
                    item.mass,
                    fuel.name,
                    room.name,
                    heat / 1e6,
                    peak(item) / 1e6,
                    heat / 1e6 / room.floor_area()
                );
            }
        }
        short_of_air(out, plan, item);
        flashover(out, plan, item.room);
    }
}

/// When oxygen in the rooms that stand open to the item's room is used up.
fn short_of_air(out: &mut String, plan: &Plan, item: &Item) {
    let (joined, outside) = joined(plan, item.room);
    let volume: f64 = joined.iter().map(|id| plan.rooms[id.0].volume()).sum();
    let names: Vec<&str> = joined
        .iter()
        .map(|id| plan.rooms[id.0].name.as_str())
        .collect();
    line!(
        out,
        "    air at hand with doors as at ignition: {volume:.0} m3 ({})",
        names.join(", ")
    );
    if outside {
        line!(
            out,
            "    these rooms stand open to the open air: fed through the openings above"
        );
        return;
    }
    let time = |per_volume: f64| match &item.burning {
        Burning::Growing(Curve::Growth { alpha, peak })
        | Burning::AsGiven(Curve::Growth { alpha, peak }) => {
            Some(hand::time_of_heat(*alpha, *peak, per_volume * volume))
        }
        Burning::Burner { rate, .. } => Some(per_volume * volume / rate),
        _ => None,
    };
    if let (Some(early), Some(late)) = (
        time(hand::HEAT_TO_15_PERCENT),
        time(hand::HEAT_TO_13_PERCENT),
    ) {
        line!(
            out,
            "    short of air by hand calculation about {early:.0} to {late:.0} s after it is lit\n    (15 to 13 % oxygen with all of that air mixed; a single room runs short sooner)"
        );
    }
}

fn flashover(out: &mut String, plan: &Plan, id: RoomId) {
    let room = &plan.rooms[id.0];
    let of_room =
        |opening: &&Opening| opening.from == Space::Room(id) || opening.to == Space::Room(id);
    let open: Vec<&Opening> = plan
        .openings
        .iter()
        .filter(of_room)
        .filter(|opening| stands_open(opening))
        .collect();
    let factor: f64 = open
        .iter()
        .filter(|opening| !opening.kind.is_horizontal())
        .map(|opening| hand::opening_factor(opening.clear_width, opening.head - opening.sill))
        .sum();
    if factor <= 0.0 {
        line!(
            out,
            "    flashover by hand calculation: not asked, every door and window of {} is shut at ignition",
            room.name
        );
        return;
    }
    let surface = hand::inner_surface(room, open.iter().map(|opening| open_area(opening)).sum());
    let mqh = hand::conductance(&room.walls, LINING_TIME)
        .map(|conductance| hand::flashover_mqh(factor, surface, conductance));
    line!(
        out,
        "    flashover of {} by hand calculation, +/- 30 %, openings as at ignition ({:.2} MW of air):\n      Thomas {:.2} MW, Babrauskas {:.2} MW{}",
        room.name,
        hand::air_limit(factor) / 1e6,
        hand::flashover_thomas(factor, surface) / 1e6,
        hand::flashover_babrauskas(factor) / 1e6,
        mqh.map_or_else(String::new, |mqh| format!(
            ", McCaffrey, Quintiere and Harkleroad {:.2} MW at {LINING_TIME:.0} s",
            mqh / 1e6
        )),
    );
}

/// Rooms that stand open to a room at ignition, and whether any of them stands
/// open to the open air.
fn joined(plan: &Plan, start: RoomId) -> (Vec<RoomId>, bool) {
    let mut found = vec![start];
    let mut outside = false;
    let mut next = 0;
    while let Some(&room) = found.get(next) {
        next += 1;
        for opening in plan.openings.iter().filter(|opening| stands_open(opening)) {
            let other = match (opening.from, opening.to) {
                (from, to) if from == Space::Room(room) => to,
                (from, to) if to == Space::Room(room) => from,
                _ => continue,
            };
            match other {
                Space::OpenAir => outside = true,
                Space::Room(id) if !found.contains(&id) => found.push(id),
                Space::Room(_) => {}
            }
        }
    }
    found.sort_unstable();
    (found, outside)
}

fn peak(item: &Item) -> f64 {
    match &item.burning {
        Burning::Growing(Curve::Growth { peak, .. })
        | Burning::AsGiven(Curve::Growth { peak, .. }) => *peak,
        Burning::Growing(Curve::Table(rates)) | Burning::AsGiven(Curve::Table(rates)) => {
            rates.iter().map(|(_, rate)| *rate).fold(0.0, f64::max)
        }
        Burning::Burner { rate, .. } => *rate,
    }
}

fn side(plan: &Plan, space: Space) -> &str {
    match space {
        Space::OpenAir => super::fields::OPEN_AIR_NAME,
        Space::Room(id) => plan.rooms.get(id.0).map_or("", |room| room.name.as_str()),
    }
}

fn widest<'a>(names: impl Iterator<Item = &'a str>) -> usize {
    names.map(|name| name.chars().count()).max().unwrap_or(0)
}

/// Minutes and seconds.
fn clock(seconds: f64) -> String {
    let whole = seconds.round();
    let minutes = (whole / 60.0).floor();
    let rest = whole - 60.0 * minutes;
    if minutes > 0.0 {
        format!("{minutes:.0} min {rest:02.0} s")
    } else {
        format!("{rest:.0} s")
    }
}
