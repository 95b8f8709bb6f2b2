//! One run: stretches between landings, output off the interpolant, ledger.

use super::building::{Building, PlanFault};
use super::derivative::Model;
use super::driver::Driver;
use super::flags::Watch;
use super::groups::content;
use super::integrator::Solution;
use super::layout::Account;
use super::observe::Observer;
use super::stretches::stretches;
use crate::plan::Plan;
use crate::record::{Closure, Ledger, Names, Record, Work};

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
    let mut driver = Driver::new(Model::new(plan, &building), watch);
    let mut state = building.initial_state(plan);
    let at_start = {
        let zero = vec![0.0; building.rooms.len()];
        let model = &mut driver.model;
        content(&building, &mut model.layers, &model.areas, &state, &zero)
    };
    let mut out = Output {
        observer: Observer::new(),
        watch: Watch::new(plan),
        work: Work::default(),
        rates: vec![0.0; state.len()],
        every: every.max(1e-3),
    };
    let ended = stretches(&mut driver, &mut state, &mut out);
    let pressures = mean_pressures(&driver.model, &state);
    let at_end = {
        let model = &mut driver.model;
        content(
            &building,
            &mut model.layers,
            &model.areas,
            &state,
            &pressures,
        )
    };
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
        fired: driver.triggers.fired.clone(),
        ended,
    })
}

/// What a run puts out.
pub struct Output {
    observer: Observer,
    watch: Watch,
    /// Work so far.
    pub work: Work,
    rates: Vec<f64>,
    every: f64,
}

impl Output {
    /// A row at a time and state, unless there is one already.
    pub fn row(&mut self, driver: &mut Driver<'_, '_>, time: f64, y: &[f64]) {
        if self
            .observer
            .time
            .last()
            .is_some_and(|last| time <= *last + 1e-9)
        {
            return;
        }
        // Output evaluations are not work of the integrator.
        if driver.evaluate(time, y, &mut self.rates).is_ok() {
            self.observer.row(&driver.model, time, y);
            self.watch.look(&driver.model, time);
        }
    }

    /// Rows of a stretch after its start, up to the time it reached; one at that
    /// very time when it is a `landing`.
    pub fn stretch(
        &mut self,
        driver: &mut Driver<'_, '_>,
        solution: &Solution,
        start: f64,
        landing: bool,
    ) {
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
        let on_grid = (n * self.every - solution.time).abs() < 1e-9;
        if landing || on_grid {
            self.row(driver, solution.time, &solution.state);
        }
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
