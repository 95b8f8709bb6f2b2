//! The short reading of a building that `doorglow check` prints.

use super::hand;
use super::resolve::{energy, stands_open};
use crate::plan::{Burning, Curve, Effect, Item, Opening, OpeningKind, Plan, RoomId, Space};
use std::fmt::Write as _;

/// Time after ignition at which linings are judged, s.
const LINING_TIME: f64 = 120.0;

/// The building in words and hand figures: rooms, openings and the air they
/// could feed, leakage, fire load, when the fire may run short of air, and
/// bands for flashover. Nothing is run.
pub fn building_text(plan: &Plan) -> String {
    let mut out = String::new();
    rooms(&mut out, plan);
    openings(&mut out, plan);
    contents(&mut out, plan);
    actions(&mut out, plan);
    out.push_str(
        "\nHand figures are cross-checks with wide bands; the run does not use them.\n\
         For planning and teaching only, never for decisions at a live incident.\n",
    );
    out
}

/// A line; writing to a string cannot fail.
macro_rules! line {
    ($out:expr, $($words:tt)*) => {
        let _ = writeln!($out, $($words)*);
    };
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
    for room in &plan.rooms {
        line!(
            out,
            "  {:widest$}  {:.2} x {:.2} x {:.2} m  {:5.1} m2  {:6.1} m3",
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

fn openings(out: &mut String, plan: &Plan) {
    line!(
        out,
        "\nOPENINGS (air that can burn through, by hand: 1500 A sqrt(H) kW)"
    );
    let moved = || {
        plan.openings
            .iter()
            .filter(|opening| opening.kind != OpeningKind::Gap)
    };
    let widest = widest(moved().map(|opening| opening.name.as_str()));
    for opening in moved() {
        let height = opening.head - opening.sill;
        let factor = |width| hand::opening_factor(width, height);
        let now = if opening.clear_width <= 0.0 {
            format!("shut, gap {:.4} m2", opening.gap_area)
        } else if opening.clear_width < opening.width {
            format!(
                "{:.2} m clear, {:.2} MW",
                opening.clear_width,
                hand::air_limit(factor(opening.clear_width)) / 1e6
            )
        } else {
            "open".to_owned()
        };
        line!(
            out,
            "  {:widest$}  {:.2} x {:.2} m  A sqrt(H) {:.2} m5/2  {:.2} MW when open; now {now}",
            opening.name,
            opening.width,
            height,
            factor(opening.width),
            hand::air_limit(factor(opening.width)) / 1e6,
        );
        line!(
            out,
            "  {:widest$}  {} to {}",
            "",
            side(plan, opening.from),
            side(plan, opening.to)
        );
    }
    if moved().next().is_none() {
        line!(out, "  none");
    }
    let leak: f64 = plan
        .openings
        .iter()
        .filter(|opening| opening.from == Space::OpenAir || opening.to == Space::OpenAir)
        .map(|opening| {
            let open = if opening.width > 0.0 {
                opening.clear_width / opening.width
            } else {
                0.0
            };
            opening.gap_area * (1.0 - open)
        })
        .sum();
    line!(
        out,
        "  gaps to the open air at ignition: {leak:.3} m2 (orifice area), about {:.0} kW by the same rule",
        plan.rooms
            .first()
            .map_or(0.0, |room| 1500.0 * leak * room.height.sqrt())
    );
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
            "    by hand short of air about {early:.0} to {late:.0} s after it is lit\n    (15 to 13 % oxygen with all of that air mixed; a single room runs short sooner)"
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
    let area = |opening: &&Opening| opening.clear_width * (opening.head - opening.sill);
    let factor: f64 = open
        .iter()
        .map(|opening| hand::opening_factor(opening.clear_width, opening.head - opening.sill))
        .sum();
    if factor <= 0.0 {
        line!(
            out,
            "    flashover by hand: not asked, every door and window of {} is shut at ignition",
            room.name
        );
        return;
    }
    let surface = hand::inner_surface(room, open.iter().map(area).sum());
    let mqh = hand::conductance(&room.walls, LINING_TIME)
        .map(|conductance| hand::flashover_mqh(factor, surface, conductance));
    line!(
        out,
        "    flashover of {} by hand, +/- 30 %, openings as at ignition ({:.2} MW of air):\n      Thomas {:.2} MW, Babrauskas {:.2} MW{}",
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

fn actions(out: &mut String, plan: &Plan) {
    line!(out, "\nACTIONS");
    if plan.actions.is_empty() {
        line!(out, "  none");
    }
    for action in &plan.actions {
        let because = action
            .because
            .as_ref()
            .map_or_else(String::new, |because| format!(" ({because})"));
        let done = done(plan, action.effect, &action.what, &because);
        line!(out, "  {:>8}  {}: {done}", clock(action.time), action.name);
    }
}

/// What a change does, in words and by hand.
fn done(plan: &Plan, effect: Effect, what: &str, because: &str) -> String {
    match effect {
        Effect::ClearWidth { opening, width } => {
            let Some(opening) = plan.openings.get(opening.0) else {
                return String::new();
            };
            if opening.kind.is_horizontal() {
                let area = opening.area * width / opening.width;
                return format!("{} {what}{because}; {area:.2} m2", opening.name);
            }
            let factor = hand::opening_factor(width, opening.head - opening.sill);
            format!(
                "{} {what}{because}; {width:.2} m clear, {:.2} MW by hand",
                opening.name,
                hand::air_limit(factor) / 1e6
            )
        }
        Effect::Fan { fan, running } => {
            let name = plan.fans.get(fan.0).map_or("", |fan| fan.name.as_str());
            let verb = if running { "starts" } else { "stops" };
            format!("{name} {verb}{because}")
        }
    }
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
