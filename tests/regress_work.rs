//! Work of two runs, as counts that do not depend on the machine: a change that
//! costs steps, iterations or allocations shows here before it shows as time.
//! A new count is taken over on purpose, with its reason in the commit.
// Helpers outside the test functions may unwrap.
#![allow(clippy::unwrap_used)]

mod common;

use doorglow::plan::Plan;
use doorglow::record::Ended;
use doorglow::solve;
use std::fmt::Write as _;

/// Work with a row a second, and allocations without output.
fn work(plan: &Plan) -> String {
    let mut record = None;
    let rows = solve::run(plan, 1.0, &mut |_| false).unwrap();
    let quiet = allocation_counter::measure(|| {
        record = Some(solve::run(plan, 1e9, &mut |_| false).unwrap());
    });
    let work = record.unwrap().work;
    assert_eq!(rows.ended, Ended::Completed);
    // Rows are read off the interpolant: they must not steer the steps.
    assert_eq!(work.steps, rows.work.steps);
    assert_eq!(work.evaluations, rows.work.evaluations);
    let mut out = String::new();
    for (what, count) in [
        ("evaluations", work.evaluations),
        ("steps", work.steps),
        ("rejections", work.rejections),
        ("iterations of the pressure balance", work.newton_iterations),
        ("touched guards", work.guards),
        ("allocations per step", quiet.count_total / work.steps),
    ] {
        writeln!(out, "{what}: {count}").unwrap();
    }
    out
}

#[test]
fn regress_work_of_the_one_room_door_case() {
    insta::assert_snapshot!(work(&common::one_room_door()));
}

#[test]
fn regress_work_of_larch_row() {
    insta::assert_snapshot!(work(&common::larch_row()));
}
