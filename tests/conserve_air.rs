//! Every way air moves, in plans drawn by lot: closures, bounds, no chattering,
//! mirrored buildings, names.
// Tables for `--nocapture`.
#![allow(clippy::print_stdout)]

mod common;

use common::{checks, moving_air};
use doorglow::plan::Plan;
use doorglow::record::{Quantity, Record, Subject};
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
