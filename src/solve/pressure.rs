//! The quasi-steady pressure balance: room pressures such that the layers of
//! every room just fill it. Damped Newton with the analytic slope of the
//! orifice law, warm-started; rooms of a tight group share one dynamic mean
//! pressure whose rate is solved for at the same time.

use super::building::Building;
use super::changes::Changes;
use super::layers::Layers;
use super::layout::{LOWER, UPPER};
use super::linear::solve_in_place;
use super::passage::Passage;
use super::schedule::coefficient_area;
use crate::physics::mixing;
use crate::physics::opening_flow::REGULARISATION;
use crate::plan::{Choices, Fan, Opening};

/// Relative tolerance of the volume balance.
const TOLERANCE: f64 = 1e-9;

/// Absolute floor of the balance: the volume rate of 1 kW of heat, m3/s.
const FLOOR: f64 = 2.8e-3;

/// Pressure that counts as none in the balance, Pa: hydrostatic pressures of
/// some 100 Pa are known to about 1e-14 of themselves, which a wide opening
/// turns into more flow than the floor.
const PRESSURE_NOISE: f64 = 1e-13;

/// Relative noise of a pressure difference against the pressures, some units
/// in the last place: wide openings between rooms at some kPa turn it into
/// flows that no search can settle.
const NOISE: f64 = 8.0 * f64::EPSILON;

/// Share of the promised fall of the residual that a step must bring.
const SUFFICIENT: f64 = 0.1;

/// Most iterations before the state is given up.
const MOST_ITERATIONS: usize = 60;

/// Fastest rate at which a tight group's mean pressure may even out near zero
/// difference, 1/s: its orifice law is made linear below the difference that
/// gives this rate, or the square root's slope there would limit the steps.
const EVENING_RATE: f64 = 2.0;

/// Largest difference below which it may be made linear, Pa.
const WIDEST_REGULARISATION: f64 = 10.0;

/// Rooms joined by openings that share one dynamic mean pressure.
#[derive(Debug, Clone, PartialEq)]
pub struct TightGroup {
    /// Its rooms.
    pub rooms: Vec<usize>,
}

/// Why no balance was found.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct NoBalance;

/// The balance with its working memory; the solution is kept as the start of
/// the next one.
#[derive(Debug, Clone)]
pub struct Balance {
    /// Openings in the order of the plan, then fans.
    pub passages: Vec<Passage>,
    /// Newton iterations so far.
    pub iterations: u64,
    /// Gauge pressures at the rooms' floors (Pa), then the rates of the tight
    /// groups' mean pressures (Pa/s).
    solution: Vec<f64>,
    rooms: usize,
    /// Tight group of each room.
    group_of: Vec<Option<usize>>,
    /// Evening-out of the groups' pressures, see [`Balance::evening`].
    evening: Vec<f64>,
    fixed: Vec<f64>,
    stiffness: Vec<f64>,
    internal: Vec<[f64; 2]>,
    residual: Vec<f64>,
    scale: Vec<f64>,
    /// Residuals that count as none, now and at the start of a step.
    allowed: Vec<f64>,
    held: Vec<f64>,
    trial: Vec<f64>,
    matrix: Vec<f64>,
    step: Vec<f64>,
}

/// What a solution needs to know.
pub struct Problem<'a> {
    /// The building.
    pub building: &'a Building,
    /// Openings of the plan.
    pub openings: &'a [Opening],
    /// Fans of the plan.
    pub fans: &'a [Fan],
    /// How far momentum mixes each room, 0..1.
    pub mixed: &'a [f64],
    /// Coefficients.
    pub choices: &'a Choices,
    /// Layers.
    pub layers: &'a Layers,
    /// Changes that do not depend on the pressures.
    pub changes: &'a Changes,
    /// Tight groups.
    pub groups: &'a [TightGroup],
    /// Mean gauge pressure of each tight group, Pa.
    pub group_pressure: &'a [f64],
}

impl Balance {
    /// Working memory for a building.
    pub fn new(building: &Building, openings: &[Opening], fans: &[Fan]) -> Self {
        let n = building.rooms.len();
        let outside = 2 * n;
        let ways = openings.iter().enumerate();
        let driven = fans.iter().enumerate();
        Self {
            passages: ways
                .map(|(i, o)| Passage::of_opening(i, o, outside))
                .chain(driven.map(|(i, f)| Passage::of_fan(i, f, openings, outside)))
                .collect(),
            iterations: 0,
            solution: vec![0.0; 2 * n],
            rooms: n,
            group_of: vec![None; n],
            evening: vec![0.0; n],
            fixed: vec![0.0; n],
            stiffness: vec![0.0; n],
            internal: vec![[0.0; 2]; n],
            residual: vec![0.0; 2 * n],
            scale: vec![0.0; 2 * n],
            allowed: vec![0.0; 2 * n],
            held: vec![0.0; 2 * n],
            trial: vec![0.0; 2 * n],
            matrix: vec![0.0; 4 * n * n],
            step: vec![0.0; 2 * n],
        }
    }

    /// Gauge pressure at a room's floor, Pa.
    pub fn pressure(&self, room: usize) -> f64 {
        self.solution[room]
    }

    /// Rate of the mean pressure of a tight group, Pa/s.
    pub fn group_rate(&self, group: usize) -> f64 {
        self.solution[self.rooms + group]
    }

    /// Rate at which a tight group's pressure evens out through all its ways, over
    /// the root of the difference, Pa^(1/2)/s.
    pub fn evening(&self, group: usize) -> f64 {
        self.evening[group]
    }

    /// Gauge pressure of a room (Pa) that the last search for a balance tried
    /// last; not a number when it ran away entirely.
    pub fn tried(&self, room: usize) -> f64 {
        self.trial[room]
    }

    /// Solves for the pressures; streams of all passages are left filled.
    ///
    /// # Errors
    /// No balance within the iterations.
    pub fn solve(&mut self, problem: &Problem<'_>) -> Result<(), NoBalance> {
        self.prepare(problem);
        let unknowns = self.rooms + problem.groups.len();
        self.trial.copy_from_slice(&self.solution);
        self.shift_to_means(problem);
        let mut norm = self.evaluate(problem);
        for _ in 0..MOST_ITERATIONS {
            if norm <= 1.0 {
                self.solution.copy_from_slice(&self.trial);
                return Ok(());
            }
            self.iterations += 1;
            for (step, residual) in self.step[..unknowns].iter_mut().zip(&self.residual) {
                *step = -residual;
            }
            if !solve_in_place(&mut self.matrix, &mut self.step, unknowns) {
                return Err(NoBalance);
            }
            self.solution.copy_from_slice(&self.trial);
            norm = self.damped_step(problem, norm, unknowns);
            if !norm.is_finite() {
                self.solution.fill(0.0);
                return Err(NoBalance);
            }
        }
        self.solution.fill(0.0);
        Err(NoBalance)
    }

    /// Starts the rooms of tight groups from pressures whose mean is right.
    fn shift_to_means(&mut self, problem: &Problem<'_>) {
        for (group, pressure) in problem.groups.iter().zip(problem.group_pressure) {
            let volume = |r: &usize| problem.building.rooms[*r].volume;
            let whole: f64 = group.rooms.iter().map(volume).sum();
            let moment: f64 = group.rooms.iter().map(|r| volume(r) * self.trial[*r]).sum();
            for &room in &group.rooms {
                self.trial[room] += pressure - moment / whole;
            }
        }
    }

    /// Takes the Newton step from the solution, halved until the residual
    /// falls; gives the new residual.
    fn damped_step(&mut self, problem: &Problem<'_>, before: f64, unknowns: usize) -> f64 {
        let mut factor = 1.0;
        let mut norm = f64::INFINITY;
        // One measure for the whole search: with the flows of each trial in it,
        // a step that lowers residual and flows alike would look like none.
        self.held.copy_from_slice(&self.allowed);
        for _ in 0..30 {
            for i in 0..unknowns {
                self.trial[i] = self.solution[i] + factor * self.step[i];
            }
            norm = self.evaluate(problem);
            let merit = largest(&self.residual[..unknowns], &self.held);
            // Armijo's condition: a full step across the root's zero lands as far
            // on the other side and would go to and fro for ever.
            if norm <= 1.0 || merit < (1.0 - SUFFICIENT * factor) * before {
                break;
            }
            factor *= 0.5;
        }
        norm
    }

    fn prepare(&mut self, problem: &Problem<'_>) {
        let layers = problem.layers;
        for r in 0..self.rooms {
            let (l, u) = (2 * r + LOWER, 2 * r + UPPER);
            self.fixed[r] = problem.changes.growth(problem.building, layers, l)
                + problem.changes.growth(problem.building, layers, u);
            let inside = |from: usize, into: usize| {
                layers.growth(from, into) - 1.0 / layers.layers[from].density
            };
            self.internal[r] = [inside(l, u), inside(u, l)];
            self.stiffness[r] = [l, u]
                .iter()
                .map(|k| {
                    let gas = &layers.layers[*k];
                    gas.volume * (1.0 - gas.gas_constant / gas.heat_capacity)
                })
                .sum::<f64>()
                / layers.pressure[r];
        }
        for passage in &mut self.passages {
            passage.prepare(layers, problem.mixed);
        }
        self.regularise(problem);
    }

    /// Widens the linear part of the orifice law of the ways out of tight
    /// groups where the group would even out faster than is worth following.
    fn regularise(&mut self, problem: &Problem<'_>) {
        for passage in &mut self.passages {
            passage.regularisation = REGULARISATION;
        }
        if problem.groups.is_empty() {
            return;
        }
        self.group_of.fill(None);
        for (g, group) in problem.groups.iter().enumerate() {
            for &room in &group.rooms {
                self.group_of[room] = Some(g);
            }
        }
        let speed = (2.0 / problem.building.air_density).sqrt();
        for (g, group) in problem.groups.iter().enumerate() {
            let leads_out = |passage: &Passage| {
                let inside = |room: Option<usize>| room.and_then(|r| self.group_of[r]) == Some(g);
                let [first, second] = passage.rooms();
                inside(first) != inside(second)
            };
            let ways = self.passages.iter().zip(problem.openings);
            let area: f64 = ways
                .filter(|(passage, _)| leads_out(passage))
                .map(|(passage, o)| coefficient_area(o, &passage.stand))
                .sum();
            let stiffness: f64 = group.rooms.iter().map(|r| self.stiffness[*r]).sum();
            self.evening[g] = area * speed / stiffness;
            let root = self.evening[g] / EVENING_RATE;
            let wide = (root * root).min(WIDEST_REGULARISATION);
            for n in 0..self.passages.len() {
                if leads_out(&self.passages[n]) {
                    let own = &mut self.passages[n].regularisation;
                    *own = own.max(wide);
                }
            }
        }
    }

    /// Fills streams, residual and matrix at the trial pressures; gives the
    /// largest residual over its tolerance.
    fn evaluate(&mut self, problem: &Problem<'_>) -> f64 {
        let n = self.rooms;
        let unknowns = n + problem.groups.len();
        self.matrix[..unknowns * unknowns].fill(0.0);
        self.residual[..n].copy_from_slice(&self.fixed);
        for (scale, fixed) in self.scale.iter_mut().zip(&self.fixed) {
            *scale = fixed.abs() + FLOOR;
        }
        for passage in &mut self.passages {
            if passage.is_closed() {
                passage.clear();
                continue;
            }
            passage.flow(problem, &self.trial);
            passage.add_to_balance(
                problem.layers,
                &self.internal,
                &mut self.residual,
                &mut self.scale,
                &mut self.matrix,
                unknowns,
            );
        }
        self.groups(problem, unknowns);
        for i in 0..unknowns {
            // What the last digits of the pressures make of the flows.
            let known = NOISE * self.trial[i].abs() + PRESSURE_NOISE;
            let noise = known * self.matrix[i * unknowns + i].abs();
            self.allowed[i] = TOLERANCE * self.scale[i] + noise;
        }
        largest(&self.residual[..unknowns], &self.allowed)
    }

    /// How far the momentum of what goes through a room would mix it, and how
    /// fast it turns its gas over (1/s), by the solution found.
    pub fn mixing(&self, problem: &Problem<'_>, room: usize) -> (f64, f64) {
        let [low, up] = [2 * room + LOWER, 2 * room + UPPER].map(|k| &problem.layers.layers[k]);
        let mean = (low.mass + up.mass) / (low.volume + up.volume);
        let mut entering = mixing::Entering::default();
        for passage in &self.passages {
            for direction in 0..2 {
                if passage.rooms()[1 - direction] != Some(room) {
                    continue;
                }
                let volume = |direction: usize| -> f64 {
                    let stream = &passage.streams[direction];
                    let source = passage.source(direction).into_iter().enumerate();
                    source
                        .map(|(k, from)| stream.of_layer(k) / problem.layers.layers[from].density)
                        .sum()
                };
                let net = volume(direction) - volume(1 - direction);
                let density = passage.streams[direction].total() / volume(direction);
                entering.add(net, passage.clear_area(problem));
                entering.differs(net, density - mean);
            }
        }
        let hull = &problem.building.rooms[room];
        let through = entering.flow();
        if through <= 0.0 {
            return (0.0, 0.0);
        }
        let section = hull.width.min(hull.length) * hull.height;
        let speed = mixing::stirring_speed(through, section, entering.speed_squared());
        let difference = (low.density - up.density).max(0.0).max(entering.contrast());
        let lighter = mean - 0.5 * difference;
        let richardson = mixing::richardson(mean + 0.5 * difference, lighter, hull.height, speed);
        let share = problem.choices.mixing_factor.min(1.0) * mixing::mixed_share(richardson);
        (share, through / hull.volume)
    }

    /// Compression of tight groups and the condition that ties their
    /// pressures to the dynamic mean.
    fn groups(&mut self, problem: &Problem<'_>, unknowns: usize) {
        for (g, group) in problem.groups.iter().enumerate() {
            let at = self.rooms + g;
            let volume: f64 = group
                .rooms
                .iter()
                .map(|r| problem.building.rooms[*r].volume)
                .sum();
            let mut mean = 0.0;
            for &r in &group.rooms {
                let weight = problem.building.rooms[r].volume / volume;
                mean += weight * self.trial[r];
                self.matrix[at * unknowns + r] = weight;
                self.matrix[r * unknowns + at] = -self.stiffness[r];
                self.residual[r] -= self.stiffness[r] * self.trial[at];
                self.scale[r] += (self.stiffness[r] * self.trial[at]).abs();
            }
            self.residual[at] = mean - problem.group_pressure[g];
            self.scale[at] = 1.0 + problem.group_pressure[g].abs();
        }
    }
}

/// Largest residual over what is allowed; not a number counts as infinite.
fn largest(residual: &[f64], allowed: &[f64]) -> f64 {
    residual
        .iter()
        .zip(allowed)
        .map(|(residual, allowed)| residual.abs() / allowed)
        .fold(
            0.0,
            |a, b| if b.is_nan() { f64::INFINITY } else { a.max(b) },
        )
}
