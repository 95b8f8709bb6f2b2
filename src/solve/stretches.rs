//! From landing to landing: which rooms are tight, where that changes as
//! openings move, and the integration in between.

use super::building::Building;
use super::derivative::Refusal;
use super::driver::Driver;
use super::groups::{settle, tight};
use super::integrator::{Outcome, Solution, Stretch, integrate};
use super::layout::Account;
use super::pressure::TightGroup;
use super::run::Output;
use super::schedule::{Landing, Schedule, Stand, stand};
use crate::plan::Plan;
use crate::record::Ended;

/// First step after something jumped, s.
const RESTART_STEP: f64 = 0.02;

/// Longest step, s, so that no short pulse is skipped.
const LONGEST_STEP: f64 = 10.0;

/// Absolute tolerance of the scaled state as a share of the relative one.
const ABSOLUTE_SHARE: f64 = 0.1;

/// Precision to which the call for a change of the cut openings is located, s.
const MOMENT: f64 = 1e-6;

/// Share of a stretch to which a change of the tight groups is located.
const RESOLUTION: f64 = 1e-6;

/// Places in a stretch at which a change of the tight groups is looked for.
const LOOKS: usize = 16;

/// Plays the whole plan from the given state, which ends up as the last one.
pub fn stretches(driver: &mut Driver<'_, '_>, state: &mut Vec<f64>, out: &mut Output) -> Ended {
    let plan = driver.model.plan;
    let scale = driver.model.building.scales();
    let mut time = 0.0;
    let mut first_step = RESTART_STEP;
    let mut jumped = f64::NEG_INFINITY;
    while plan.end - time > 1e-9 {
        let landing = next_landing(&driver.model.schedule, time, plan.end);
        // A rate books what leaves with a leaf that moves, not with one that
        // jumps. A stretch may begin twice at the same time.
        if time > jumped {
            let lost = driver.model.heat_of_jumps(time, state);
            state[driver.model.building.layout.account(Account::EnergyLost)] += lost;
            jumped = time;
        }
        let end = begin(driver, state, time, landing.time);
        if time <= 0.0 {
            out.row(driver, time, state);
        }
        let stretch = Stretch {
            start: time,
            end,
            first_step,
            longest_step: LONGEST_STEP,
            relative: plan.choices.tolerance,
            absolute: ABSOLUTE_SHARE * plan.choices.tolerance,
        };
        let mut solution = integrate(driver, &scale, &stretch, state);
        if solution.outcome == Outcome::Stopped && !driver.interrupted {
            locate(driver, &mut solution);
        }
        let (refusal, changed) = outcome(driver, &solution);
        out.work.steps += solution.steps;
        out.work.rejections += solution.rejections;
        let landed = landing.time - solution.time < 1e-9;
        let over = driver.interrupted || matches!(solution.outcome, Outcome::Failed(_));
        out.stretch(driver, &solution, time, landed || over);
        time = solution.time;
        state.clone_from(&solution.state);
        match &solution.outcome {
            Outcome::Stopped if driver.interrupted => return Ended::Interrupted(time),
            Outcome::Failed(why) if !changed => return Ended::Failed(time, explain(why, refusal)),
            _ => {}
        }
        first_step = RESTART_STEP;
        if landed && !landing.restart && !changed && solution.outcome == Outcome::Reached {
            first_step = solution.last_step;
        }
    }
    Ended::Completed
}

fn next_landing(schedule: &Schedule, time: f64, end: f64) -> Landing {
    let next = schedule.landings.iter().find(|l| l.time > time + 1e-9);
    next.copied().unwrap_or(Landing {
        time: end,
        restart: true,
    })
}

/// Takes a solution that was stopped for a change of the cut openings or for a
/// trigger back to the moment at which it was called for, so that it does not
/// depend on where the steps happened to end; fires what is passed there.
fn locate(driver: &mut Driver<'_, '_>, solution: &mut Solution) {
    let mut rates = vec![0.0; solution.state.len()];
    let mut calls = |time: f64, state: &[f64]| {
        driver.evaluate(time, state, &mut rates).is_ok() && driver.calls_for_change(time, state)
    };
    let (mut low, mut high) = (solution.before, solution.time);
    while high - low > MOMENT {
        let middle = 0.5 * (low + high);
        match solution.at(middle) {
            Some(state) if calls(middle, &state) => high = middle,
            _ => low = middle,
        }
    }
    if let Some(state) = solution.at(high) {
        calls(high, &state);
        (solution.time, solution.state) = (high, state);
        let state = &solution.state;
        driver.triggers.fire(&mut driver.model, high, state);
    }
}

/// Why the last evaluation was refused, and whether other openings are cut
/// from here on.
fn outcome(driver: &mut Driver<'_, '_>, solution: &Solution) -> (Option<Refusal>, bool) {
    let refusal = driver.model.refusal;
    let changed = match solution.outcome {
        Outcome::Reached => false,
        Outcome::Stopped => driver.adapt(),
        Outcome::Failed(_) => driver.adapt_to_refusal(),
    };
    (refusal, changed)
}

/// Makes model and state fit the tight groups from `time` on; gives the time up
/// to which they hold, at most `landing`.
fn begin(driver: &mut Driver<'_, '_>, state: &mut [f64], time: f64, landing: f64) -> f64 {
    let (plan, building) = (driver.model.plan, driver.model.building);
    let mut rates = vec![0.0; state.len()];
    // Every pass cuts at least one more opening.
    loop {
        let schedule = &driver.model.schedule;
        let (groups, end) = hold(plan, building, schedule, &driver.cut, time, landing);
        let old = std::mem::take(&mut driver.model.groups);
        let model = &mut driver.model;
        settle(
            building,
            &mut model.layers,
            &model.areas,
            state,
            &old,
            &groups,
        );
        driver.model.groups = groups;
        driver.keep_within(time, end);
        let changed = match driver.evaluate(time, state, &mut rates) {
            Ok(()) => driver.adapt_up(),
            Err(_) => driver.adapt_to_refusal(),
        };
        if !changed {
            return end;
        }
    }
}

fn stands(plan: &Plan, schedule: &Schedule, time: f64) -> Vec<Stand> {
    plan.openings
        .iter()
        .enumerate()
        .map(|(o, opening)| stand(opening, schedule.clear_width(o, time)))
        .collect()
}

/// Tight groups just after `start` and how long they hold, at most to `end`.
fn hold(
    plan: &Plan,
    building: &Building,
    schedule: &Schedule,
    cut: &[bool],
    start: f64,
    end: f64,
) -> (Vec<TightGroup>, f64) {
    let groups = |share: f64| {
        let time = start + share * (end - start);
        tight(plan, building, &stands(plan, schedule, time), cut)
    };
    let first = groups(RESOLUTION);
    let mut low = RESOLUTION;
    for n in 1..=LOOKS {
        let look = (n as f64 / LOOKS as f64).min(1.0 - RESOLUTION);
        if groups(look) == first {
            low = look;
            continue;
        }
        let mut high = look;
        while high - low > 0.5 * RESOLUTION {
            let middle = 0.5 * (low + high);
            if groups(middle) == first {
                low = middle;
            } else {
                high = middle;
            }
        }
        if high < 1.0 - RESOLUTION {
            return (first, start + high * (end - start));
        }
    }
    (first, end)
}

fn explain(why: &str, refusal: Option<Refusal>) -> String {
    match refusal {
        Some(Refusal::State) => format!("{why}: a layer left all bounds of temperature or mass"),
        Some(Refusal::Pressure) => format!("{why}: the room pressures could not be balanced"),
        None => why.to_string(),
    }
}
