//! Five hundred plans drawn by lot (own generator, fixed seeds): every run must
//! come to its end and keep its books, whatever is opened, shut, sealed or set
//! on fire. Names must not matter at all and order must not matter beyond the
//! tolerance.
// Tables for `--nocapture`.
#![allow(clippy::print_stdout)]

mod common;

use common::checks::faults;
use common::generated;
use doorglow::plan::{OpeningKind, Plan};
use doorglow::record::{Dimension, Ended, Quantity, Record, Subject};
use doorglow::solve;
use rayon::prelude::*;

/// Plans of the large test.
const PLANS: u64 = 500;

/// Evaluations of one run above which something was stiff.
const MOST_EVALUATIONS: u64 = 30_000;

/// Seconds between output rows.
const EVERY: f64 = 2.0;

fn run(plan: &Plan) -> Record {
    solve::run(plan, EVERY, &mut |_| false).expect("a plan that can be solved")
}

/// Faults of a run in words, with its work.
fn judge(plan: &Plan) -> Vec<String> {
    let record = run(plan);
    let mut faults = faults(plan, &record);
    if record.work.evaluations > MOST_EVALUATIONS {
        faults.push(format!("{} evaluations", record.work.evaluations));
    }
    faults
}

#[test]
fn conserve_five_hundred_generated_plans() {
    let workers = rayon::ThreadPoolBuilder::new().num_threads(2);
    let wrong: Vec<String> = workers.build().unwrap().install(|| {
        (0..PLANS)
            .into_par_iter()
            .filter_map(|seed| {
                let faults = judge(&generated::plan(seed));
                (!faults.is_empty()).then(|| format!("seed {seed}: {}", faults.join("; ")))
            })
            .collect()
    });
    assert!(
        wrong.is_empty(),
        "{} of {PLANS}:\n{}",
        wrong.len(),
        wrong.join("\n")
    );
}

/// The draw must hold what the test is about.
#[test]
fn conserve_the_draw_has_what_it_should() {
    let plans: Vec<Plan> = (0..PLANS).map(generated::plan).collect();
    let share = |what: &dyn Fn(&Plan) -> bool| {
        plans.iter().filter(|plan| what(plan)).count() as f64 / plans.len() as f64
    };
    let sealed = share(&|p| p.openings.iter().all(|o| o.kind != OpeningKind::Gap));
    let crowded = share(&|p| p.rooms.len() == 6);
    let shared = share(&|p| !p.shared_walls.is_empty());
    let moved = share(&|p| p.actions.len() > 3);
    let repeated = share(&|p| {
        let o = |n: usize| p.actions[n].effect.opening();
        (1..p.actions.len()).any(|n| (0..n).any(|m| o(m) == o(n)))
    });
    let mixed = share(&|p| p.fuels.len() == 3);
    let high = share(&|p| {
        let room = |room: doorglow::plan::RoomId| &p.rooms[room.0];
        p.items
            .iter()
            .any(|i| i.surface_height > room(i.room).height - 0.3)
    });
    for (what, share, least) in [
        ("no leakage", sealed, 0.2),
        ("six rooms", crowded, 0.1),
        ("shared walls", shared, 0.15),
        ("many actions", moved, 0.2),
        ("several on one opening", repeated, 0.2),
        ("three fuels", mixed, 0.2),
        ("fire near the ceiling", high, 0.2),
    ] {
        assert!(share > least, "{what}: only {share:.2}");
    }
}

#[test]
fn conserve_renaming_changes_nothing() {
    for seed in 0..20 {
        let plan = generated::plan(seed);
        let mut renamed = plan.clone();
        // In the reverse of their alphabet, so that sorting would show.
        let name = |n: usize, what: &str| {
            format!(
                "{} {what}",
                char::from(b'z' - u8::try_from(n).unwrap_or(25))
            )
        };
        for (n, room) in renamed.rooms.iter_mut().enumerate() {
            room.name = name(n, "room");
        }
        for (n, opening) in renamed.openings.iter_mut().enumerate() {
            opening.name = name(n, "opening");
        }
        for (n, item) in renamed.items.iter_mut().enumerate() {
            item.name = name(n, "item");
        }
        let (first, second) = (run(&plan), run(&renamed));
        assert_eq!(first.columns.len(), second.columns.len());
        for (a, b) in first.columns.iter().zip(&second.columns) {
            let bits = |values: &[f64]| values.iter().map(|v| v.to_bits()).collect::<Vec<_>>();
            assert_eq!(
                bits(&a.values),
                bits(&b.values),
                "seed {seed}: {:?}",
                a.quantity
            );
        }
        assert_eq!(first.work, second.work);
    }
}

/// Tolerance at which order is tried.
const FINE: f64 = 1e-8;

#[test]
fn conserve_reordering_changes_nothing_beyond_tolerance() {
    let wrong: Vec<String> = (0..20_u64)
        .into_par_iter()
        .flat_map_iter(|seed| {
            let mut plan = generated::plan(seed);
            plan.choices.tolerance = FINE;
            let other = generated::reordered(&plan, 1000 + seed);
            let (first, second) = (run(&plan), run(&other.plan));
            let subject = |old: Subject| match old {
                Subject::Room(n) => Subject::Room(other.rooms[n]),
                Subject::Opening(n) => Subject::Opening(other.openings[n]),
                Subject::Item(n) => Subject::Item(other.items[n]),
                other => other,
            };
            assert_eq!(first.ended, Ended::Completed);
            differences(&first, &second, subject)
                .into_iter()
                .map(move |fault| format!("seed {seed}: {fault}"))
        })
        .collect();
    assert!(
        wrong.is_empty(),
        "{} histories:\n{}",
        wrong.len(),
        wrong.join("\n")
    );
}

/// Peaks below which a history is none: milliwatts of heat tell nothing.
fn floor(quantity: Quantity) -> f64 {
    match quantity.dimension() {
        Dimension::Power => 1.0,
        _ => 1e-9,
    }
}

/// Histories that differ by more than 1e-4 of their peak over all subjects of
/// that kind.
fn differences(
    first: &Record,
    second: &Record,
    subject: impl Fn(Subject) -> Subject,
) -> Vec<String> {
    let mut faults = Vec::new();
    for column in &first.columns {
        let other = second.get(subject(column.subject), column.quantity);
        let peak = first
            .columns
            .iter()
            .filter(|c| c.quantity == column.quantity)
            .flat_map(|c| &c.values)
            .filter(|v| v.is_finite())
            .fold(floor(column.quantity), |a, b| a.max(b.abs()));
        let worst = column
            .values
            .iter()
            .zip(other)
            .zip(&first.time)
            .map(|((a, b), t)| ((a - b).abs() / peak, *t))
            .filter(|(d, _)| d.is_finite())
            .fold((0.0, 0.0), |a, b| if b.0 > a.0 { b } else { a });
        if worst.0 > 1e-4 || other.len() != column.values.len() {
            faults.push(format!(
                "{:?} {:?} by {:.1e} of {peak:.1e} at {:.0} s",
                column.subject, column.quantity, worst.0, worst.1
            ));
        }
    }
    faults
}

#[test]
fn conserve_a_leak_free_room() {
    for rate in [5e3, 50e3, 500e3] {
        let lining = common::lining(0.0125, 0.2, 800.0, 1000.0);
        let plan = common::plan(
            600.0,
            vec![common::room("room", 3.0, 4.0, 2.4, &lining)],
            Vec::new(),
            vec![common::methane()],
            vec![common::burner(0, rate, 0.4, 0.3, false)],
        );
        assert_eq!(judge(&plan), Vec::<String>::new(), "{rate} W");
    }
}

#[test]
fn conserve_a_building_at_rest() {
    let lining = common::lining(0.0125, 0.2, 800.0, 1000.0);
    let rooms = vec![
        common::room("one", 3.0, 4.0, 2.4, &lining),
        common::room("two", 5.0, 4.0, 3.0, &lining),
    ];
    let openings = vec![
        common::door("between", 0, Some(1), 0.8, 2.0, true),
        common::door("out", 1, None, 0.9, 2.0, true),
        common::gap(0, 2.4, 0.01),
    ];
    let plan = common::plan(600.0, rooms, openings, Vec::new(), Vec::new());
    let record = run(&plan);
    assert_eq!(faults(&plan, &record), Vec::<String>::new());
    for column in record.columns.iter().filter(|c| {
        use Quantity as Q;
        matches!(
            c.quantity,
            Q::UpperTemperature | Q::LowerTemperature | Q::CeilingTemperature
        )
    }) {
        let moved = column.values.iter().map(|t| (t - 293.15).abs());
        let moved = moved.fold(0.0, f64::max);
        // At rest the steps grow until rounding swings within the tolerance,
        // 1e-5 of 293 K a step.
        assert!(
            moved < 0.05,
            "{:?} {:?} by {moved} K",
            column.subject,
            column.quantity
        );
    }
}

#[test]
fn conserve_a_fire_above_the_interface() {
    let lining = common::lining(0.0125, 0.2, 800.0, 1000.0);
    for open in [false, true] {
        for item in [
            common::burner(0, 200e3, 0.4, 2.35, false),
            common::burner(0, 1e6, 1.0, 1.8, true),
        ] {
            let plan = common::plan(
                600.0,
                vec![common::room("room", 3.0, 4.0, 2.4, &lining)],
                vec![
                    common::door("door", 0, None, 0.9, 2.0, open),
                    common::gap(0, 2.4, 0.02),
                ],
                vec![common::methane()],
                vec![item],
            );
            assert_eq!(judge(&plan), Vec::<String>::new());
        }
    }
}
