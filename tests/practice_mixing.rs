//! Where the momentum of wind or a fan mixes a corridor, a kneeling person
//! meets the corridor's mean.
// Tables for `--nocapture`.
#![allow(clippy::print_stdout, clippy::too_many_lines)]

mod common;

use common::generated::Dice;
use common::{burner, door, gap, lining, methane, plan, polyurethane, room};
use doorglow::plan::{
    Action, Burning, Curve, Effect, Fan, FanId, FanKind, FuelId, Item, Limits, OpeningId,
    OpeningKind, Plan, RoomId, Space, Station,
};
use doorglow::record::{Ended, Quantity, Record, Subject};
use rayon::prelude::*;

const FIRE: usize = 0;
const CORRIDOR: usize = 1;
const SIDE: usize = 2;

/// What drives the air.
#[derive(Debug, Clone, Copy, PartialEq)]
enum Drive {
    /// Wind on the window of the fire room.
    Wind,
    /// A fan that blows into the fire room.
    Fan,
    /// A fan that blows cold air into the corridor by a side room.
    Aside,
    /// A fan at the far end of the corridor; the fire room's window lets it out.
    Against,
}

fn sofa() -> Item {
    Item {
        name: "sofa".into(),
        room: RoomId(FIRE),
        fuel: FuelId(0),
        mass: 60.0,
        burning: Burning::Growing(Curve::Growth {
            alpha: 46.9,
            peak: 3000e3,
        }),
        surface_height: 0.4,
        gap_to_wall: None,
        in_corner: false,
        ignition: 0.0,
        at: None,
    }
}

fn corridor(seed: u64) -> (Plan, Drive) {
    let mut dice = Dice::new(seed ^ 0xC0_44D0);
    let dice = &mut dice;
    let drive = match dice.below(8) {
        0..=3 => Drive::Wind,
        4 | 5 => Drive::Fan,
        6 => Drive::Aside,
        _ => Drive::Against,
    };
    let solid = lining(0.15, 1.0, 1800.0, 850.0);
    let height = dice.between(2.2, 3.0);
    let mut rooms = vec![
        room(
            "fire",
            dice.between(3.0, 5.0),
            dice.between(3.0, 5.0),
            height,
            &solid,
        ),
        room(
            "corridor",
            dice.between(1.1, 2.0),
            dice.between(5.0, 14.0),
            height,
            &solid,
        ),
    ];
    let head = dice.between(1.9, 2.1);
    let mut openings = vec![
        door(
            "window",
            FIRE,
            None,
            dice.between(1.0, 2.2),
            height - 0.2,
            true,
        ),
        door(
            "inner door",
            FIRE,
            Some(CORRIDOR),
            dice.between(0.7, 1.0),
            head,
            true,
        ),
        door(
            "way out",
            CORRIDOR,
            None,
            dice.between(0.5, 1.2),
            head,
            true,
        ),
        gap(FIRE, height, 0.02),
        gap(CORRIDOR, height, 0.02),
    ];
    openings[0].kind = OpeningKind::Window;
    openings[0].sill = dice.between(0.6, 1.0);
    let speed = dice.between(5.0, 13.0);
    let mut fan = Fan {
        name: "fan".into(),
        kind: FanKind::Duct {
            from: Space::OpenAir,
            intake: 1.0,
            to: Space::Room(RoomId(FIRE)),
            outlet: 1.0,
        },
        free_flow: dice.between(2.0, 6.0),
        dead_end_pressure: dice.between(30.0, 200.0),
        running: false,
    };
    let mut fans = Vec::new();
    match drive {
        Drive::Wind => {
            let dynamic = 0.5 * 1.25 * speed * speed;
            openings[0].wind_pressure = 0.7 * dynamic;
            for o in [2, 4] {
                openings[o].wind_pressure = -0.3 * dynamic;
            }
        }
        Drive::Fan => {
            openings[0].clear_width = 0.2;
            fans.push(fan);
        }
        Drive::Aside => {
            rooms.push(room("side", 3.0, 3.0, height, &solid));
            openings.push(door("side door", SIDE, Some(CORRIDOR), 0.9, head, true));
            openings.push(door("side front", SIDE, None, 0.9, head, true));
            let dynamic = 0.5 * 1.25 * speed * speed;
            openings[0].wind_pressure = 0.5 * dynamic;
            fan.kind = FanKind::PositivePressure {
                opening: OpeningId(6),
                covers: dice.between(0.6, 1.0),
            };
            fans.push(fan);
        }
        Drive::Against => {
            fan.kind = FanKind::PositivePressure {
                opening: OpeningId(2),
                covers: dice.between(0.5, 1.0),
            };
            fans.push(fan);
        }
    }
    let item = if dice.chance(0.5) {
        burner(FIRE, dice.decades(200e3, 2000e3), 0.6, 0.4, false)
    } else {
        sofa()
    };
    let fuel = if item.name == "sofa" {
        polyurethane()
    } else {
        methane()
    };
    let mut plan = plan(420.0, rooms, openings, vec![fuel], vec![item]);
    plan.open_air.temperature = dice.between(268.15, 298.15);
    if !fans.is_empty() {
        plan.actions.push(Action {
            name: "start".into(),
            time: dice.between(60.0, 240.0),
            over: 2.0,
            effect: Effect::Fan {
                fan: FanId(0),
                running: true,
            },
            what: "start".into(),
            because: None,
        });
    }
    plan.fans = fans;
    plan.stations.push(Station {
        name: "kneeling".into(),
        room: RoomId(CORRIDOR),
        height: 1.0,
        posture: "kneeling".into(),
        limits: Limits {
            attention_temperature: 333.15,
            out_temperature: 373.15,
            oxygen: 0.19,
            visibility: 3.0,
        },
    });
    (plan, drive)
}

/// Largest deviation from the mean rise (as a share of it) where the corridor
/// has been mixed for a minute: share, time, rise; how many outputs counted.
fn deviation(plan: &Plan, record: &Record) -> (f64, f64, f64, usize) {
    let of_room = |q| record.get(Subject::Room(CORRIDOR), q);
    let share = of_room(Quantity::MixedShare);
    let mean = of_room(Quantity::MeanTemperature);
    let there = record.get(Subject::Station(0), Quantity::StationTemperature);
    let start = plan.rooms[CORRIDOR].temperature;
    let mut since = f64::INFINITY;
    let mut worst = (0.0, 0.0, 0.0, 0);
    for (n, time) in record.time.iter().enumerate() {
        since = if share[n] > 0.9 {
            since.min(*time)
        } else {
            f64::INFINITY
        };
        let rise = mean[n] - start;
        if time - since < 60.0 || rise < 10.0 {
            continue;
        }
        worst.3 += 1;
        let off = (there[n] - mean[n]) / rise;
        if off.abs() > f64::abs(worst.0) {
            (worst.0, worst.1, worst.2) = (off, *time, rise);
        }
    }
    worst
}

#[test]
fn practice_kneeling_in_a_mixed_corridor_meets_its_mean() {
    let found: Vec<_> = (0..200_u64)
        .into_par_iter()
        .map(|seed| {
            let (plan, drive) = corridor(seed);
            let mut record = doorglow::solve::run(&plan, 1.0, &mut |_| false).expect("a good plan");
            doorglow::exposure::observe(&mut record, &plan);
            let closed = record.ledger.energy.relative < 1e-3 && record.ended == Ended::Completed;
            (seed, drive, deviation(&plan, &record), closed)
        })
        .collect();
    for drive in [Drive::Wind, Drive::Fan, Drive::Aside, Drive::Against] {
        let of: Vec<_> = found.iter().filter(|f| f.1 == drive && f.2.3 > 0).collect();
        let mut all: Vec<f64> = of.iter().map(|f| f.2.0).collect();
        all.sort_by(f64::total_cmp);
        println!(
            "{drive:?}: {} of {} mixed for a minute, deviation {:?} .. {:?}",
            of.len(),
            found.iter().filter(|f| f.1 == drive).count(),
            all.first(),
            all.last()
        );
    }
    let bad: Vec<_> = found
        .iter()
        .filter(|f| f.2.0.abs() > 0.15 || !f.3)
        .collect();
    for f in &bad {
        println!("{f:?}");
    }
    let mixed = found.iter().filter(|f| f.2.3 > 0).count();
    assert!(mixed >= 60, "only {mixed} corridors are mixed for a minute");
    assert!(bad.is_empty(), "{} corridors deviate", bad.len());
}
