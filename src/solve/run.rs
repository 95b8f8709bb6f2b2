//! One run: stretches between landings, output off the interpolant, ledger.

use super::building::{Building, PlanFault};
use super::derivative::{Model, Refusal};
use super::flags::Watch;
use super::groups::{OVERPRESSURE, content, settle, tight};
use super::integrator::{Equations, Outcome, Solution, Stretch, integrate};
use super::layout::Account;
use super::observe::Observer;
use super::schedule::{Landing, Schedule, Stand, stand};
use crate::plan::Plan;
use crate::record::{Closure, Ended, Ledger, Names, Record, Work};

/// First step after something jumped, s.
const RESTART_STEP: f64 = 0.02;

/// Longest step, s, so that no short pulse is skipped.
const LONGEST_STEP: f64 = 10.0;

/// Absolute tolerance of the scaled state as a share of the relative one.
const ABSOLUTE_SHARE: f64 = 0.1;

/// The model behind the integrator's door.
struct Driver<'a, 'w> {
    model: Model<'a>,
    watch: &'w mut dyn FnMut(f64) -> bool,
    evaluations: u64,
    interrupted: bool,
    overpressure: bool,
}

impl Equations for Driver<'_, '_> {
    fn rates(&mut self, time: f64, y: &[f64], dy: &mut [f64]) -> bool {
        self.evaluations += 1;
        self.model.evaluate(time, y, dy).is_ok()
    }

    fn accepted(&mut self, time: f64, _y: &[f64]) -> bool {
        self.interrupted = (self.watch)(time);
        let model = &self.model;
        self.overpressure = (0..model.building.rooms.len()).any(|room| {
            model.balance.pressure(room).abs() > OVERPRESSURE
                && !model.groups.iter().any(|g| g.rooms.contains(&room))
        });
        self.interrupted || self.overpressure
    }
}

/// Runs a plan and records it every `every` seconds (and at every action).
///
/// `watch` gets the simulated time reached after every step and returns true
/// to stop there. A run that cannot go on keeps what it has and says in
/// [`Record::ended`] when and why.
///
/// # Errors
/// A plan with a fuel or lining that cannot be used.
pub fn run(
    plan: &Plan,
    every: f64,
    watch: &mut dyn FnMut(f64) -> bool,
) -> Result<Record, PlanFault> {
    let building = Building::new(plan)?;
    let schedule = Schedule::new(plan);
    let mut driver = Driver {
        model: Model::new(plan, &building, &schedule),
        watch,
        evaluations: 0,
        interrupted: false,
        overpressure: false,
    };
    let mut state = building.initial_state(plan);
    let at_start = {
        let zero = vec![0.0; building.rooms.len()];
        content(&building, &mut driver.model.layers, &state, &zero)
    };
    let scale = building.scales();
    let mut out = Output {
        observer: Observer::new(),
        watch: Watch::new(plan),
        work: Work::default(),
        rates: vec![0.0; state.len()],
        every: every.max(1e-3),
    };
    let ended = stretches(
        plan,
        &building,
        &schedule,
        &scale,
        &mut driver,
        &mut state,
        &mut out,
    );
    let pressures = mean_pressures(&driver.model, &state);
    let at_end = content(&building, &mut driver.model.layers, &state, &pressures);
    out.work.evaluations = driver.evaluations;
    out.work.newton_iterations = driver.model.balance.iterations;
    out.work.guards = driver.model.guards;
    Ok(Record {
        names: names(plan),
        time: out.observer.time,
        columns: out.observer.columns,
        ledger: ledger(&building, &state, &at_start, &at_end),
        work: out.work,
        flags: out.watch.finish(),
        ended,
    })
}

struct Output {
    observer: Observer,
    watch: Watch,
    work: Work,
    rates: Vec<f64>,
    every: f64,
}

impl Output {
    fn row(&mut self, driver: &mut Driver<'_, '_>, time: f64, y: &[f64]) {
        if self
            .observer
            .time
            .last()
            .is_some_and(|last| time <= *last + 1e-9)
        {
            return;
        }
        // Output evaluations are not work of the integrator.
        if driver.model.evaluate(time, y, &mut self.rates).is_ok() {
            self.observer.row(&driver.model, time, y);
            self.watch.look(&driver.model, time);
        }
    }

    /// Rows of a stretch after its start, up to the time it reached.
    fn stretch(&mut self, driver: &mut Driver<'_, '_>, solution: &Solution, start: f64) {
        let mut n = (start / self.every).floor() + 1.0;
        while n * self.every < solution.time - 1e-9 {
            let time = n * self.every;
            if time > start + 1e-9
                && let Some(y) = solution.at(time)
            {
                self.row(driver, time, &y);
            }
            n += 1.0;
        }
        self.row(driver, solution.time, &solution.state);
    }
}

fn stands(plan: &Plan, schedule: &Schedule, time: f64) -> Vec<Stand> {
    plan.openings
        .iter()
        .enumerate()
        .map(|(o, opening)| stand(opening, schedule.clear_width(opening, o, time)))
        .collect()
}

/// How the openings stand during a stretch, at their widest.
fn widest(plan: &Plan, schedule: &Schedule, start: f64, end: f64) -> Vec<Stand> {
    let inside = 1e-6 * (end - start);
    let early = stands(plan, schedule, start + inside);
    let late = stands(plan, schedule, end - inside);
    early
        .into_iter()
        .zip(late)
        .map(|(a, b)| {
            if a.coefficient_width > b.coefficient_width {
                a
            } else {
                b
            }
        })
        .collect()
}

#[allow(clippy::too_many_arguments)]
fn stretches(
    plan: &Plan,
    building: &Building,
    schedule: &Schedule,
    scale: &[f64],
    driver: &mut Driver<'_, '_>,
    state: &mut Vec<f64>,
    out: &mut Output,
) -> Ended {
    let mut landings = schedule.landings.clone();
    landings.push(Landing {
        time: plan.end,
        restart: true,
    });
    let mut forced = vec![false; building.rooms.len()];
    let mut time = 0.0;
    let mut next = 0;
    let mut first_step = RESTART_STEP;
    let mut begun = false;
    while next < landings.len() {
        let end = landings[next].time;
        let open = widest(plan, schedule, time, end);
        let groups = tight(plan, building, &open, &forced);
        let old = std::mem::take(&mut driver.model.groups);
        settle(building, &mut driver.model.layers, state, &old, &groups);
        driver.model.groups = groups;
        if !begun {
            out.row(driver, time, state);
            begun = true;
        }
        let stretch = Stretch {
            start: time,
            end,
            first_step,
            longest_step: LONGEST_STEP,
            relative: plan.choices.tolerance,
            absolute: ABSOLUTE_SHARE * plan.choices.tolerance,
        };
        let solution = integrate(driver, scale, &stretch, state);
        out.work.steps += solution.steps;
        out.work.rejections += solution.rejections;
        out.stretch(driver, &solution, time);
        time = solution.time;
        state.clone_from(&solution.state);
        first_step = RESTART_STEP;
        match &solution.outcome {
            Outcome::Reached => {
                if landings[next].restart {
                    forced.fill(false);
                } else {
                    first_step = solution.last_step;
                }
                next += 1;
            }
            Outcome::Stopped if driver.interrupted => return Ended::Interrupted(time),
            Outcome::Stopped => force(&driver.model, &mut forced),
            Outcome::Failed(why) => {
                return Ended::Failed(time, explain(why, driver.model.refusal));
            }
        }
        if end - time < 1e-9 && solution.outcome == Outcome::Stopped {
            next += 1;
        }
    }
    Ended::Completed
}

/// Makes the groups of rooms at too high a quasi-steady pressure tight.
fn force(model: &Model<'_>, forced: &mut [bool]) {
    for (room, forced) in forced.iter_mut().enumerate() {
        *forced |= model.balance.pressure(room).abs() > OVERPRESSURE;
    }
}

fn explain(why: &str, refusal: Option<Refusal>) -> String {
    match refusal {
        Some(Refusal::State) => format!("{why}: a layer left all bounds of temperature or mass"),
        Some(Refusal::Pressure) => format!("{why}: the room pressures could not be balanced"),
        None => why.to_string(),
    }
}

fn mean_pressures(model: &Model<'_>, y: &[f64]) -> Vec<f64> {
    let mut pressures = vec![0.0; model.building.rooms.len()];
    for group in &model.groups {
        for &room in &group.rooms {
            pressures[room] = y[model.building.layout.pressure(group.rooms[0])];
        }
    }
    pressures
}

fn names(plan: &Plan) -> Names {
    Names {
        rooms: plan.rooms.iter().map(|r| r.name.clone()).collect(),
        openings: plan.openings.iter().map(|o| o.name.clone()).collect(),
        items: plan.items.iter().map(|i| i.name.clone()).collect(),
        stations: plan.stations.iter().map(|s| s.name.clone()).collect(),
    }
}

fn ledger(building: &Building, y: &[f64], start: &[f64; 4], end: &[f64; 4]) -> Ledger {
    let account = |a| y[building.layout.account(a)];
    let close = |i: usize, gained, lost, base: f64| {
        let (gained, lost): (f64, f64) = (account(gained), account(lost));
        let through = if base > 0.0 {
            base
        } else {
            gained.abs().max(lost.abs())
        };
        let content = start[i].abs().max(end[i].abs());
        // Relative to what went through, or to the content where next to
        // nothing did.
        let over = if through > 1e-3 * content {
            through
        } else {
            content.max(1e-12)
        };
        Closure {
            at_start: start[i],
            at_end: end[i],
            gained,
            lost,
            relative: (end[i] - start[i] - gained + lost).abs() / over,
        }
    };
    Ledger {
        mass: close(0, Account::MassGained, Account::MassLost, 0.0),
        oxygen: close(1, Account::OxygenGained, Account::OxygenLost, 0.0),
        carbon: close(2, Account::CarbonGained, Account::CarbonLost, 0.0),
        energy: close(
            3,
            Account::EnergyGained,
            Account::EnergyLost,
            account(Account::HeatReleased),
        ),
    }
}
