//! Every way air moves, in plans drawn by lot: closures, bounds, no chattering,
//! mirrored buildings, names.
// Tables for `--nocapture`.
#![allow(clippy::print_stdout)]

mod common;

use common::{checks, moving_air};
use doorglow::plan::{Effect, FanKind, OpeningId, Plan, RoomId, Space, Watched};
use doorglow::record::{Ended, Quantity, Record, Subject};
use rayon::prelude::*;

/// Net flow below which a hatch counts as still, kg/s.
const STILL: f64 = 1e-4;

fn run(plan: &Plan) -> Record {
    doorglow::solve::run(plan, 1.0, &mut |_| false).expect("a plan that can be run")
}

/// Most changes of direction of the net flow within a minute through one hatch
/// or stair, and where: opening and time (s).
fn turns(plan: &Plan, record: &Record) -> (usize, usize, f64) {
    let mut worst = (0, 0, 0.0);
    for (o, opening) in plan.openings.iter().enumerate() {
        if !opening.kind.is_horizontal() {
            continue;
        }
        let forward = record.get(Subject::Opening(o), Quantity::FlowForward);
        let backward = record.get(Subject::Opening(o), Quantity::FlowBackward);
        let mut sign = 0.0;
        let mut turned: Vec<f64> = Vec::new();
        for (n, time) in record.time.iter().enumerate() {
            let net = forward[n] - backward[n];
            if net.abs() < STILL {
                continue;
            }
            if sign * net < 0.0 {
                turned.push(*time);
            }
            sign = net.signum();
        }
        for (n, time) in turned.iter().enumerate() {
            let within = turned[n..].iter().take_while(|t| **t < time + 60.0).count();
            if within > worst.0 {
                worst = (within, o, *time);
            }
        }
    }
    worst
}

#[test]
fn conserve_three_hundred_plans_of_moving_air() {
    let count: u64 = std::env::var("PLANS").map_or(300, |n| n.parse().unwrap());
    let first: u64 = std::env::var("FIRST").map_or(0, |n| n.parse().unwrap());
    let found: Vec<_> = (first..first + count)
        .into_par_iter()
        .map(|seed| {
            let plan = if std::env::var("BASE").is_ok() {
                common::generated::plan(seed)
            } else {
                moving_air::plan(seed)
            };
            let record = run(&plan);
            let mut faults = checks::faults_within(&plan, &record, 1e-4);
            let turns = turns(&plan, &record);
            if turns.0 > 12 {
                faults.push(format!("{turns:?} turns a minute"));
            }
            (
                seed,
                faults,
                turns,
                record.work.evaluations,
                plan.end,
                plan.rooms.len(),
                record.fired.len(),
            )
        })
        .collect();
    let mut work: Vec<_> = found.iter().map(|f| (f.3 as f64 / f.4, f.0)).collect();
    work.sort_by(|a, b| b.0.total_cmp(&a.0));
    println!(
        "most evaluations per second: {:?}",
        &work[..5.min(work.len())]
    );
    let mut turned: Vec<_> = found.iter().map(|f| (f.2, f.0)).collect();
    turned.sort_by_key(|t| std::cmp::Reverse(t.0.0));
    println!("most turns: {:?}", &turned[..5.min(turned.len())]);
    println!("fired: {}", found.iter().map(|f| f.6).sum::<usize>());
    let bad: Vec<_> = found.iter().filter(|f| !f.1.is_empty()).collect();
    for f in &bad {
        println!("seed {}: {:?}", f.0, f.1);
    }
    assert!(bad.is_empty(), "{} plans fail", bad.len());
}

/// The building seen in a mirror: rooms and openings in the opposite order, the
/// sides of upright openings swapped.
fn mirrored(plan: &Plan) -> Plan {
    let rooms = plan.rooms.len();
    let openings = plan.openings.len();
    let room = |id: RoomId| RoomId(rooms - 1 - id.0);
    let opening = |id: OpeningId| OpeningId(openings - 1 - id.0);
    let space = |space: Space| match space {
        Space::Room(id) => Space::Room(room(id)),
        Space::OpenAir => Space::OpenAir,
    };
    let effect = |effect: Effect| match effect {
        Effect::ClearWidth { opening: o, width } => Effect::ClearWidth {
            opening: opening(o),
            width,
        },
        Effect::Fan { .. } => effect,
    };
    let mut mirror = plan.clone();
    mirror.rooms.reverse();
    mirror.openings.reverse();
    for o in &mut mirror.openings {
        if let (false, Space::Room(a), Space::Room(b)) = (o.kind.is_horizontal(), o.from, o.to) {
            let shift = plan.rooms[a.0].floor_level - plan.rooms[b.0].floor_level;
            o.sill += shift;
            o.head += shift;
        }
        (o.from, o.to) = if o.kind.is_horizontal() {
            (space(o.from), space(o.to))
        } else {
            (space(o.to), space(o.from))
        };
    }
    for wall in &mut mirror.shared_walls {
        wall.between = wall.between.map(room);
    }
    for item in &mut mirror.items {
        item.room = room(item.room);
    }
    for fan in &mut mirror.fans {
        fan.kind = match fan.kind {
            FanKind::PositivePressure { opening: o, covers } => FanKind::PositivePressure {
                opening: opening(o),
                covers,
            },
            FanKind::Duct {
                from,
                intake,
                to,
                outlet,
            } => FanKind::Duct {
                from: space(from),
                intake,
                to: space(to),
                outlet,
            },
        };
    }
    for action in &mut mirror.actions {
        action.effect = effect(action.effect);
    }
    for trigger in &mut mirror.triggers {
        trigger.effect = effect(trigger.effect);
        trigger.watched = match trigger.watched {
            Watched::UpperTemperature(id) => Watched::UpperTemperature(room(id)),
            Watched::Interface(id) => Watched::Interface(room(id)),
            Watched::UpperOxygen(id) => Watched::UpperOxygen(room(id)),
            Watched::PaneRise(id) => Watched::PaneRise(opening(id)),
            Watched::HeatRelease => Watched::HeatRelease,
        };
    }
    mirror
}

/// Largest difference of the layers' temperatures over the peak rise, and where.
fn apart(plan: &Plan, record: &Record, mirror: &Record) -> (f64, String) {
    let mut worst = (0.0, String::new());
    let hottest = (0..plan.rooms.len())
        .flat_map(|r| record.get(Subject::Room(r), Quantity::UpperTemperature))
        .fold(0.0, |a: f64, b| a.max(*b));
    let peak = (hottest - plan.open_air.temperature).max(20.0);
    for room in 0..plan.rooms.len() {
        for quantity in [Quantity::UpperTemperature, Quantity::LowerTemperature] {
            let here = record.get(Subject::Room(room), quantity);
            let there = mirror.get(Subject::Room(plan.rooms.len() - 1 - room), quantity);
            // Triggers fall on slightly different times: only common rows.
            for (n, time) in record.time.iter().enumerate() {
                let Some(m) = mirror.time.iter().position(|t| t == time) else {
                    continue;
                };
                let off = (here[n] - there[m]).abs() / peak;
                if off > worst.0 {
                    worst = (off, format!("room {room} {quantity:?} at {time:.0} s"));
                }
            }
        }
    }
    worst
}

#[test]
fn conserve_mirrored_buildings_behave_alike() {
    let found: Vec<_> = (0..20_u64)
        .into_par_iter()
        .map(|seed| {
            let mut plan = moving_air::plan(seed);
            plan.choices.tolerance = 1e-8;
            plan.end = plan.end.min(300.0);
            plan.actions.retain(|a| a.time < plan.end);
            let record = run(&plan);
            let mirror = run(&mirrored(&plan));
            (
                seed,
                apart(&plan, &record, &mirror),
                record.ended,
                mirror.ended,
            )
        })
        .collect();
    let mut bad = 0;
    for (seed, (off, place), one, other) in &found {
        println!("seed {seed}: {off:.1e} {place}");
        bad += usize::from(*off > 1e-4 || *one != Ended::Completed || one != other);
    }
    assert_eq!(bad, 0);
}

#[test]
fn conserve_names_change_no_bit() {
    (0..20_u64).into_par_iter().for_each(|seed| {
        let plan = moving_air::plan(seed);
        let mut renamed = plan.clone();
        let names = renamed
            .rooms
            .iter_mut()
            .map(|r| &mut r.name)
            .chain(renamed.openings.iter_mut().map(|o| &mut o.name))
            .chain(renamed.fans.iter_mut().map(|f| &mut f.name))
            .chain(renamed.items.iter_mut().map(|i| &mut i.name))
            .chain(renamed.triggers.iter_mut().map(|t| &mut t.name));
        for (n, name) in names.enumerate() {
            *name = format!("{} other", 97 - n);
        }
        let (one, other) = (run(&plan), run(&renamed));
        for (a, b) in one.columns.iter().zip(&other.columns) {
            let same = a
                .values
                .iter()
                .zip(&b.values)
                .all(|(x, y)| x.to_bits() == y.to_bits());
            assert!(same, "seed {seed}: {:?} {:?}", a.subject, a.quantity);
        }
        assert_eq!(one.time, other.time);
    });
}
