//! The drawn plans of [`super::generated`] widened by every way air moves:
//! levels, tall shafts, hatches, stairs, divisions, wind, fans, glass, doors
//! that fail, and changes that wait. A seed gives the same building as there
//! before it is widened.
#![allow(dead_code)]

use super::generated::{self, Dice};
use doorglow::plan::{
    Action, Effect, Fan, FanId, FanKind, Opening, OpeningId, OpeningKind, Pane, Plan, RoomId,
    Space, Trigger, Watched,
};

/// Smallest depth of a door between rooms at different levels, m.
const LEAST_DEPTH: f64 = 0.5;

/// The widened plan of a seed; runs of four to ten minutes.
pub fn plan(seed: u64) -> Plan {
    let mut plan = generated::plan(seed);
    let mut dice = Dice::new(seed ^ 0x00A1_12F1_0515);
    let dice = &mut dice;
    plan.title = format!("moving air {seed}");
    plan.end = plan.end.min(600.0);
    levels(dice, &mut plan);
    fit_openings(dice, &mut plan);
    add_lying(dice, &mut plan);
    divide(dice, &mut plan);
    blow(dice, &mut plan);
    add_fans(dice, &mut plan);
    glaze(dice, &mut plan);
    wait(dice, &mut plan);
    plan.actions.retain(|a| a.time < plan.end);
    plan.actions.sort_by(|a, b| a.time.total_cmp(&b.time));
    plan
}

fn pick<'a, T>(dice: &mut Dice, list: &'a [T]) -> &'a T {
    &list[dice.below(list.len())]
}

fn levels(dice: &mut Dice, plan: &mut Plan) {
    let spread = dice.chance(0.7);
    for room in &mut plan.rooms {
        if spread {
            room.floor_level = match dice.below(5) {
                0 | 1 => 0.0,
                2 => dice.between(-0.6, 0.6),
                3 => 2.7,
                _ => *pick(dice, &[-2.6, 5.4, 8.1]),
            };
        }
        if dice.chance(0.12) {
            room.height = dice.between(5.0, 18.0);
            room.floor_level = dice.between(-9.0, 0.0);
        }
    }
}

/// Upright openings between rooms that do not share enough height become
/// hatches or stairs; the others are moved into the height that they share.
/// Leaks span their room again.
fn fit_openings(dice: &mut Dice, plan: &mut Plan) {
    let rooms = plan.rooms.clone();
    for opening in &mut plan.openings {
        let (first, second) = match (opening.from, opening.to) {
            (Space::Room(a), Space::Room(b)) => (a.0, b.0),
            (Space::Room(a), Space::OpenAir) | (Space::OpenAir, Space::Room(a)) => {
                if opening.kind == OpeningKind::Gap {
                    opening.head = rooms[a.0].height;
                }
                continue;
            }
            (Space::OpenAir, Space::OpenAir) => continue,
        };
        let (a, b) = (&rooms[first], &rooms[second]);
        let rise = b.floor_level - a.floor_level;
        let low = rise.max(0.0);
        let high = a.height.min(rise + b.height);
        if high - low >= LEAST_DEPTH {
            let depth = opening.head - opening.sill;
            opening.sill = opening.sill.max(low).min(high - LEAST_DEPTH);
            opening.head = (opening.sill + depth).min(high);
        } else {
            let (below, above) = if rise > 0.0 {
                (first, second)
            } else {
                (second, first)
            };
            lie(
                dice,
                opening,
                below,
                Space::Room(RoomId(above)),
                rooms[below].height,
            );
        }
    }
}

/// Makes a hatch or stair of an opening.
fn lie(dice: &mut Dice, opening: &mut Opening, below: usize, above: Space, height: f64) {
    let stair = above != Space::OpenAir && dice.chance(0.5);
    opening.kind = if stair {
        OpeningKind::Stair
    } else {
        OpeningKind::Hatch
    };
    opening.from = Space::Room(RoomId(below));
    opening.to = above;
    opening.sill = height;
    opening.head = height;
    opening.area = dice.decades(0.1, 4.0);
    opening.coefficient = 0.6;
    opening.exchange_factor = if stair { dice.between(1.0, 5.0) } else { 1.0 };
    opening.width = opening.area.sqrt();
    if stair {
        opening.clear_width = opening.width;
        opening.gap_area = 0.0;
    } else {
        opening.clear_width = opening.width
            * match dice.below(3) {
                0 => 0.0,
                1 => 1.0,
                _ => dice.between(0.0, 1.0),
            };
    }
}

/// Hatches in roofs, and between rooms whose floor and ceiling lie close.
fn add_lying(dice: &mut Dice, plan: &mut Plan) {
    let blank = super::door("", 0, None, 1.0, 2.0, false);
    for _ in 0..dice.below(3) {
        let room = dice.below(plan.rooms.len());
        let height = plan.rooms[room].height;
        let mut hatch = blank.clone();
        hatch.name = format!("opening {}", plan.openings.len());
        hatch.gap_area = if dice.chance(0.5) {
            0.0
        } else {
            dice.decades(1e-4, 1e-2)
        };
        lie(dice, &mut hatch, room, Space::OpenAir, height);
        plan.openings.push(hatch);
    }
    for below in 0..plan.rooms.len() {
        for above in 0..plan.rooms.len() {
            let ceiling = plan.rooms[below].floor_level + plan.rooms[below].height;
            let gap = plan.rooms[above].floor_level - ceiling;
            if below != above && (0.0..0.6).contains(&gap) && dice.chance(0.4) {
                let mut way = blank.clone();
                way.name = format!("opening {}", plan.openings.len());
                let height = plan.rooms[below].height;
                lie(dice, &mut way, below, Space::Room(RoomId(above)), height);
                plan.openings.push(way);
            }
        }
    }
}

/// Turns a door between two rooms on one level into a division.
fn divide(dice: &mut Dice, plan: &mut Plan) {
    let rooms = &plan.rooms;
    for opening in &mut plan.openings {
        let (Space::Room(a), Space::Room(b)) = (opening.from, opening.to) else {
            continue;
        };
        let (a, b) = (&rooms[a.0], &rooms[b.0]);
        if opening.kind != OpeningKind::Door || a.floor_level != b.floor_level {
            continue;
        }
        if dice.chance(0.15) {
            opening.kind = OpeningKind::Division;
            opening.sill = 0.0;
            opening.head = a.height.min(b.height);
            opening.width = a.width.min(a.length).min(b.width).min(b.length);
            opening.clear_width = opening.width;
            opening.gap_area = 0.0;
        }
    }
    let divisions: Vec<usize> = fixed(plan);
    plan.actions
        .retain(|a| a.effect.opening().is_none_or(|o| !divisions.contains(&o.0)));
    // Widths of actions were drawn for the openings as they were.
    for action in &mut plan.actions {
        if let Effect::ClearWidth { opening, width } = &mut action.effect {
            *width = width.min(plan.openings[opening.0].width);
        }
    }
}

/// Openings that nobody moves.
fn fixed(plan: &Plan) -> Vec<usize> {
    (0..plan.openings.len())
        .filter(|o| {
            matches!(
                plan.openings[*o].kind,
                OpeningKind::Division | OpeningKind::Stair | OpeningKind::Gap
            )
        })
        .collect()
}

fn leads_out(opening: &Opening) -> bool {
    opening.from == Space::OpenAir || opening.to == Space::OpenAir
}

/// Wind of up to 14 m/s on one façade after another.
fn blow(dice: &mut Dice, plan: &mut Plan) {
    if dice.chance(0.35) {
        return;
    }
    let speed = dice.between(0.0, 14.0);
    let dynamic = 0.5 * 1.25 * speed * speed;
    for opening in &mut plan.openings {
        if leads_out(opening) {
            let coefficient = match opening.kind {
                OpeningKind::Hatch => -0.3,
                _ => *pick(dice, &[0.7, 0.7, -0.5, -0.3, 0.3]),
            };
            opening.wind_pressure = coefficient * dynamic;
        }
    }
}

fn add_fans(dice: &mut Dice, plan: &mut Plan) {
    for _ in 0..dice.below(3) {
        let doors: Vec<usize> = (0..plan.openings.len())
            .filter(|o| {
                let opening = &plan.openings[*o];
                opening.kind == OpeningKind::Door && leads_out(opening)
            })
            .collect();
        let kind = if !doors.is_empty() && dice.chance(0.5) {
            FanKind::PositivePressure {
                opening: OpeningId(*pick(dice, &doors)),
                covers: dice.between(0.2, 1.0),
            }
        } else {
            duct(dice, plan)
        };
        let number = plan.fans.len();
        plan.fans.push(Fan {
            name: format!("fan {number}"),
            kind,
            free_flow: dice.decades(0.02, 5.0),
            dead_end_pressure: dice.decades(10.0, 400.0),
            running: dice.chance(0.4),
        });
        for _ in 0..dice.below(3) {
            plan.actions.push(Action {
                name: format!("action {}", plan.actions.len()),
                time: dice.between(0.0, 0.9 * plan.end),
                over: if dice.chance(0.5) {
                    0.0
                } else {
                    dice.between(0.0, 8.0)
                },
                effect: Effect::Fan {
                    fan: FanId(number),
                    running: dice.chance(0.6),
                },
                what: "switch".into(),
                because: None,
            });
        }
    }
}

fn duct(dice: &mut Dice, plan: &Plan) -> FanKind {
    let count = plan.rooms.len();
    let (a, b) = (dice.below(count), dice.below(count));
    let inside = |room: usize| Space::Room(RoomId(room));
    let (from, to) = match dice.below(3) {
        0 => (inside(a), Space::OpenAir),
        1 => (Space::OpenAir, inside(a)),
        _ if a != b => (inside(a), inside(b)),
        _ => (inside(a), Space::OpenAir),
    };
    let mut height = |space: Space| match space {
        Space::Room(room) => dice.between(0.05, 0.98) * plan.rooms[room.0].height,
        Space::OpenAir => 0.0,
    };
    let (intake, outlet) = (height(from), height(to));
    FanKind::Duct {
        from,
        intake,
        to,
        outlet,
    }
}

fn trigger(dice: &mut Dice, plan: &Plan, watched: Watched, level: f64, effect: Effect) -> Trigger {
    Trigger {
        name: format!("trigger {}", plan.triggers.len()),
        watched,
        rising: true,
        level,
        not_before: if dice.chance(0.7) {
            0.0
        } else {
            dice.between(0.0, 0.5 * plan.end)
        },
        delay: if dice.chance(0.5) {
            0.0
        } else {
            dice.between(0.0, 90.0)
        },
        over: if dice.chance(0.5) {
            0.0
        } else {
            dice.between(0.0, 10.0)
        },
        effect,
        only_widens: false,
        what: "set".into(),
        because: None,
    }
}

fn room_behind(opening: &Opening) -> Option<RoomId> {
    match (opening.from, opening.to) {
        (Space::Room(room), _) | (Space::OpenAir, Space::Room(room)) => Some(room),
        _ => None,
    }
}

/// Panes that fall out and doors that fail.
fn glaze(dice: &mut Dice, plan: &mut Plan) {
    for index in 0..plan.openings.len() {
        let opening = &plan.openings[index];
        let (kind, width) = (opening.kind, opening.width);
        let Some(room) = room_behind(opening) else {
            continue;
        };
        let out = leads_out(opening);
        let effect = Effect::ClearWidth {
            opening: OpeningId(index),
            width: width * dice.between(0.25, 1.0),
        };
        let new = match kind {
            OpeningKind::Window if out && dice.chance(0.8) => {
                plan.openings[index].pane = Some(Pane {
                    name: "test glass".into(),
                    thickness: dice.between(0.003, 0.008),
                    density: 2500.0,
                    heat_capacity: 840.0,
                    emissivity: 0.84,
                });
                if dice.chance(0.5) {
                    let level = dice.between(50.0, 150.0);
                    let id = OpeningId(index);
                    trigger(dice, plan, Watched::PaneRise(id), level, effect)
                } else {
                    let level = dice.between(400.0, 800.0);
                    trigger(dice, plan, Watched::UpperTemperature(room), level, effect)
                }
            }
            OpeningKind::Door if !out && dice.chance(0.4) => {
                let level = dice.between(400.0, 800.0);
                trigger(dice, plan, Watched::UpperTemperature(room), level, effect)
            }
            _ => continue,
        };
        plan.triggers.push(Trigger {
            only_widens: true,
            ..new
        });
    }
}

/// Actions that wait for a layer or the fire.
fn wait(dice: &mut Dice, plan: &mut Plan) {
    let still = fixed(plan);
    let movable: Vec<usize> = (0..plan.openings.len())
        .filter(|o| !still.contains(o))
        .collect();
    for _ in 0..dice.below(4) {
        let room = RoomId(dice.below(plan.rooms.len()));
        let height = plan.rooms[room.0].height;
        let (watched, rising, level) = match dice.below(5) {
            0 => (
                Watched::Interface(room),
                false,
                dice.between(0.2, 0.8) * height,
            ),
            1 => (
                Watched::Interface(room),
                true,
                dice.between(0.2, 0.8) * height,
            ),
            2 => (Watched::UpperOxygen(room), false, dice.between(0.08, 0.20)),
            3 => (Watched::HeatRelease, true, dice.decades(20e3, 2e6)),
            _ => (
                Watched::UpperTemperature(room),
                dice.chance(0.7),
                dice.between(320.0, 700.0),
            ),
        };
        let effect = if !plan.fans.is_empty() && dice.chance(0.4) {
            Effect::Fan {
                fan: FanId(dice.below(plan.fans.len())),
                running: dice.chance(0.6),
            }
        } else if movable.is_empty() {
            continue;
        } else {
            let index = *pick(dice, &movable);
            let share = if dice.chance(0.4) {
                0.0
            } else {
                dice.between(0.0, 1.0)
            };
            Effect::ClearWidth {
                opening: OpeningId(index),
                width: share * plan.openings[index].width,
            }
        };
        let new = trigger(dice, plan, watched, level, effect);
        plan.triggers.push(Trigger { rising, ..new });
    }
}
