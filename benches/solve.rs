//! Time of whole runs, with and without output, and their allocations:
//! `cargo bench --bench solve`. The column `evaluations/s` gives the cost of
//! one evaluation, overhead of the integrator included; the difference between
//! the runs with and without output is what output costs. `yardstick` is fixed
//! arithmetic, to tell a slow machine from slow code.

#[allow(clippy::unwrap_used, clippy::duplicate_mod)]
#[path = "../tests/common/mod.rs"]
mod common;

use divan::counter::ItemsCount;
use divan::{AllocProfiler, Bencher, black_box};
use doorglow::plan::Plan;
use doorglow::record::Record;
use doorglow::solve;

#[global_allocator]
static ALLOCATIONS: AllocProfiler = AllocProfiler::system();

fn main() {
    divan::main();
}

/// A million sines and roots.
#[divan::bench]
fn yardstick() -> f64 {
    (0..1_000_000)
        .map(|i| f64::from(black_box(i)).sin().abs().sqrt())
        .sum()
}

fn whole_run(bencher: Bencher<'_, '_>, plan: &Plan, every: f64) {
    let run = || -> Option<Record> { solve::run(black_box(plan), every, &mut |_| false).ok() };
    let evaluations = run().map_or(0, |record| record.work.evaluations);
    bencher.counter(ItemsCount::new(evaluations)).bench(run);
}

/// The one-room door case, 600 s, a row a second.
#[divan::bench]
fn one_room_door(bencher: Bencher<'_, '_>) {
    whole_run(bencher, &common::one_room_door(), 1.0);
}

/// The same with rows at its landings only.
#[divan::bench]
fn one_room_door_without_output(bencher: Bencher<'_, '_>) {
    whole_run(bencher, &common::one_room_door(), 1e9);
}

/// Larch Row 3, 900 s, a row a second.
#[divan::bench]
fn larch_row(bencher: Bencher<'_, '_>) {
    whole_run(bencher, &common::larch_row(), 1.0);
}

/// The same with rows at its landings only.
#[divan::bench]
fn larch_row_without_output(bencher: Bencher<'_, '_>) {
    whole_run(bencher, &common::larch_row(), 1e9);
}
