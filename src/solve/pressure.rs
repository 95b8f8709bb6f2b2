//! The quasi-steady pressure balance: room pressures such that the layers of
//! every room just fill it. Damped Newton with the analytic slope of the
//! orifice law, warm-started; rooms of a tight group share one dynamic mean
//! pressure whose rate is solved for at the same time.

use super::building::Building;
use super::changes::Changes;
use super::layers::Layers;
use super::layout::{LOWER, UPPER};
use super::linear::solve_in_place;
use super::schedule::Stand;
use crate::physics::opening_flow::{
    Bands, GRAVITY, MOST_BANDS, REGULARISATION, Side, bands_regularised,
};
use crate::physics::plume::buoyant_entrainment;
use crate::physics::smooth::smoothstep;
use crate::plan::{Choices, Opening, Space};

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

/// Exponent with which entrainment by a jet goes with its flow at one
/// temperature: 1/3 far from its opening, 0.6 near it.
const JET_EXPONENT: f64 = 0.45;

/// Most iterations before the state is given up.
const MOST_ITERATIONS: usize = 60;

/// Temperature step over which inflow turns from the lower to the upper
/// layer, K.
const DEPOSIT_STEP: f64 = 10.0;

/// Fastest rate at which a tight group's mean pressure may even out near zero
/// difference, 1/s: its orifice law is made linear below the difference that
/// gives this rate, or the square root's slope there would limit the steps.
const EVENING_RATE: f64 = 2.0;

/// Largest difference below which it may be made linear, Pa.
const WIDEST_REGULARISATION: f64 = 10.0;

/// Gas going one way through an opening.
#[derive(Debug, Clone, Copy, Default)]
pub struct Stream {
    /// Flow from source layer (first index) into destination layer (second),
    /// kg/s; outside air counts as lower.
    pub flow: [[f64; 2]; 2],
    /// Entrained from the lower into the upper layer by the rising part, kg/s.
    pub lifted: f64,
    /// Dragged from the upper into the lower layer by the falling part, kg/s.
    pub dragged: f64,
    /// Highest pressure difference that drives it, Pa.
    pub peak_difference: f64,
    /// Change of what is lifted and dragged with the flow that does it.
    slopes: [f64; 2],
}

impl Stream {
    /// Whole flow, kg/s.
    pub fn total(&self) -> f64 {
        self.flow.iter().flatten().sum()
    }

    /// Flow that one layer of the source gives, kg/s.
    pub fn of_layer(&self, layer: usize) -> f64 {
        self.flow[layer][LOWER] + self.flow[layer][UPPER]
    }
}

/// An opening in one evaluation.
#[derive(Debug, Clone, Default)]
pub struct Passage {
    /// How it stands.
    pub stand: Stand,
    /// Forward and backward streams.
    pub streams: [Stream; 2],
    /// Its bands.
    pub bands: Bands,
    /// Layers of both sides, `[side][layer]`.
    sides: [[usize; 2]; 2],
    /// Rooms of both sides.
    rooms: [Option<usize>; 2],
    /// Volume growth per kg, `[direction][source layer][destination layer]`.
    growth: [[[f64; 2]; 2]; 2],
    /// Share that goes to the upper layer by buoyancy, `[direction][source]`.
    deposit: [[f64; 2]; 2],
    /// Difference below which the orifice law is linear, Pa.
    regularisation: f64,
    /// Where the flow of each band comes from and goes.
    parts: [Part; MOST_BANDS],
}

/// How the flow of a band is split.
#[derive(Debug, Clone, Copy, Default)]
struct Part {
    /// Share drawn from each layer of the source.
    drawn: [f64; 2],
    /// Of that, the share that goes to the upper layer of the destination.
    raised: [f64; 2],
}

impl Passage {
    /// A passage for an opening of the plan.
    pub fn new(opening: &Opening, outside: usize) -> Self {
        let layers = |space| match space {
            Space::Room(room) => [2 * room.0 + LOWER, 2 * room.0 + UPPER],
            Space::OpenAir => [outside; 2],
        };
        let room = |space| match space {
            Space::Room(room) => Some(room.0),
            Space::OpenAir => None,
        };
        Self {
            sides: [layers(opening.from), layers(opening.to)],
            rooms: [room(opening.from), room(opening.to)],
            ..Self::default()
        }
    }

    /// Rooms of both sides.
    pub fn rooms(&self) -> [Option<usize>; 2] {
        self.rooms
    }

    /// Layers of the source of a direction (0 forward, 1 backward).
    pub fn source(&self, direction: usize) -> [usize; 2] {
        self.sides[direction]
    }

    /// Layers of the destination of a direction.
    pub fn destination(&self, direction: usize) -> [usize; 2] {
        self.sides[1 - direction]
    }

    /// What does not depend on the pressures.
    fn prepare(&mut self, layers: &Layers) {
        for direction in 0..2 {
            let source = self.source(direction);
            let into = self.destination(direction);
            if self.rooms[1 - direction].is_none() {
                continue;
            }
            let (low, up) = (&layers.layers[into[LOWER]], &layers.layers[into[UPPER]]);
            let reference =
                low.available * low.temperature + (1.0 - low.available) * up.temperature;
            for (k, &from) in source.iter().enumerate() {
                let gas = &layers.layers[from];
                self.deposit[direction][k] =
                    smoothstep((gas.temperature - reference) / DEPOSIT_STEP);
                self.growth[direction][k] = into.map(|into| layers.growth(from, into));
            }
        }
    }
}

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
    /// Openings.
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
    pub fn new(building: &Building, openings: &[Opening]) -> Self {
        let n = building.rooms.len();
        let outside = 2 * n;
        Self {
            passages: openings.iter().map(|o| Passage::new(o, outside)).collect(),
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
            passage.prepare(layers);
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
                inside(passage.rooms[0]) != inside(passage.rooms[1])
            };
            let ways = self.passages.iter().zip(problem.openings);
            let area: f64 = ways
                .filter(|(passage, _)| leads_out(passage))
                .map(|(passage, o)| passage.stand.coefficient_width * (o.head - o.sill))
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
        for (passage, opening) in self.passages.iter_mut().zip(problem.openings) {
            if passage.stand.coefficient_width <= 0.0 {
                passage.streams = [Stream::default(); 2];
                passage.bands = Bands::default();
                continue;
            }
            passage.flow(problem, opening, &self.trial);
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

impl Passage {
    fn side(&self, problem: &Problem<'_>, which: usize, trial: &[f64]) -> Side {
        let air = problem.building.air_density;
        // Datum: the floor of the first side, or of the second when the first
        // is the open air.
        let level = |room: usize| problem.building.rooms[room].floor_level;
        let datum = self.rooms[0].or(self.rooms[1]).map_or(0.0, level);
        match self.rooms[which] {
            None => Side {
                pressure: -air * GRAVITY * datum,
                interface: 0.0,
                density: [air; 2],
            },
            Some(room) => {
                let [l, u] = self.sides[which];
                let density = [l, u].map(|k| problem.layers.layers[k].density);
                let above = level(room) - datum;
                Side {
                    pressure: trial[room] - air * GRAVITY * level(room)
                        + density[0] * GRAVITY * above,
                    interface: problem.layers.interface[room] + above,
                    density,
                }
            }
        }
    }

    /// Streams at the trial pressures.
    fn flow(&mut self, problem: &Problem<'_>, opening: &Opening, trial: &[f64]) {
        let first = self.side(problem, 0, trial);
        let second = self.side(problem, 1, trial);
        self.bands = bands_regularised(
            &first,
            &second,
            opening.sill,
            opening.head,
            self.stand.coefficient_width,
            self.regularisation,
        );
        self.streams = [Stream::default(); 2];
        for direction in 0..2 {
            let interface = if direction == 0 {
                second.interface
            } else {
                first.interface
            };
            self.gather(problem, direction, interface);
        }
    }

    /// Gathers the bands of one direction into its stream.
    fn gather(&mut self, problem: &Problem<'_>, direction: usize, interface: f64) {
        let layers = &problem.layers.layers;
        let source = self.source(direction);
        let into = self.destination(direction);
        let inside = self.rooms[1 - direction].is_some();
        let leak = self.stand.leak_share;
        let mut stream = Stream::default();
        // Rising and falling parts: flow, heat over the layer they pass, and
        // flow times height.
        let (mut rising, mut falling) = ([0.0; 3], [0.0; 3]);
        for (band, part) in self.bands.as_slice().iter().zip(&mut self.parts) {
            if band.forward != (direction == 0) {
                continue;
            }
            stream.peak_difference = stream.peak_difference.max(band.peak_difference);
            let middle = 0.5 * (band.bottom + band.top);
            let by_height = ((band.top - band.bottom.max(interface)) / (band.top - band.bottom))
                .clamp(0.0, 1.0);
            let own = usize::from(band.from_upper);
            let weight = layers[source[own]].available;
            part.drawn[own] = weight;
            part.drawn[1 - own] = 1.0 - weight;
            for (k, flow) in part
                .drawn
                .map(|share| share * band.flow)
                .into_iter()
                .enumerate()
            {
                if !inside {
                    stream.flow[k][LOWER] += flow;
                    continue;
                }
                let deposit = self.deposit[direction][k];
                let jet = (1.0 - leak) * flow;
                let up = jet * deposit;
                // Gas from gaps goes in at its height, but hot gas rises.
                let settled = 1.0 - (1.0 - by_height) * (1.0 - deposit);
                part.raised[k] = (1.0 - leak) * deposit + leak * settled;
                stream.flow[k][UPPER] += flow * part.raised[k];
                stream.flow[k][LOWER] += flow * (1.0 - part.raised[k]);
                let gas = &layers[source[k]];
                let warmer = gas.temperature - layers[into[LOWER]].temperature;
                let cooler = layers[into[UPPER]].temperature - gas.temperature;
                for (part, flow, excess) in
                    [(&mut rising, up, warmer), (&mut falling, jet - up, cooler)]
                {
                    part[0] += flow;
                    part[1] += flow * gas.heat_capacity * excess.max(0.0);
                    part[2] += flow * middle;
                }
            }
        }
        if inside {
            let [flow, heat, moment] = rising;
            if flow > 0.0 {
                stream.lifted = problem.choices.jet_factor
                    * layers[into[LOWER]].available
                    * buoyant_entrainment(
                        flow,
                        heat,
                        (interface - moment / flow).max(0.0),
                        layers[into[LOWER]].temperature,
                    );
                stream.slopes[0] = JET_EXPONENT * stream.lifted / flow;
            }
            let [flow, heat, moment] = falling;
            if flow > 0.0 {
                stream.dragged = problem.choices.fall_factor
                    * layers[into[UPPER]].available
                    * buoyant_entrainment(
                        flow,
                        heat,
                        (moment / flow - interface).max(0.0),
                        layers[into[UPPER]].temperature,
                    );
                stream.slopes[1] = JET_EXPONENT * stream.dragged / flow;
            }
        }
        self.streams[direction] = stream;
    }

    /// Adds the passage to the volume balances of its rooms.
    fn add_to_balance(
        &self,
        layers: &Layers,
        internal: &[[f64; 2]],
        residual: &mut [f64],
        scale: &mut [f64],
        matrix: &mut [f64],
        unknowns: usize,
    ) {
        for direction in 0..2 {
            let stream = &self.streams[direction];
            let (from, to) = (self.rooms[direction], self.rooms[1 - direction]);
            for k in 0..2 {
                let out = stream.of_layer(k) / layers.layers[self.source(direction)[k]].density;
                if let Some(room) = from {
                    residual[room] -= out;
                    scale[room] += out;
                }
                if let Some(room) = to {
                    let growth = self.growth[direction][k];
                    let gain = stream.flow[k][0] * growth[0] + stream.flow[k][1] * growth[1];
                    residual[room] += gain;
                    scale[room] += gain.abs();
                }
            }
            if let Some(room) = to {
                let [up, down] = internal[room];
                residual[room] += stream.lifted * up + stream.dragged * down;
            }
        }
        self.add_slopes(layers, internal, matrix, unknowns);
    }

    fn add_slopes(
        &self,
        layers: &Layers,
        internal: &[[f64; 2]],
        matrix: &mut [f64],
        unknowns: usize,
    ) {
        for (band, part) in self.bands.as_slice().iter().zip(&self.parts) {
            let direction = usize::from(!band.forward);
            let source = self.source(direction);
            // Change of the volume balances with the pressure of the first side.
            let slope = if band.forward { band.slope } else { -band.slope };
            let (from, to) = (self.rooms[direction], self.rooms[1 - direction]);
            let [lifts, drags] = self.streams[direction].slopes;
            let [up, down] = to.map_or([0.0; 2], |room| internal[room]);
            let jet = 1.0 - self.stand.leak_share;
            let (mut out, mut gain) = (0.0, 0.0);
            for k in 0..2 {
                let drawn = slope * part.drawn[k];
                let growth = self.growth[direction][k];
                let raised = part.raised[k];
                let deposit = jet * self.deposit[direction][k];
                out -= drawn / layers.layers[source[k]].density;
                gain += drawn * (growth[0] * (1.0 - raised) + growth[1] * raised);
                gain += drawn * (deposit * lifts * up + (jet - deposit) * drags * down);
            }
            for (row, change) in [(from, out), (to, gain)] {
                let Some(row) = row else { continue };
                if let Some(first) = self.rooms[0] {
                    matrix[row * unknowns + first] += change;
                }
                if let Some(second) = self.rooms[1] {
                    matrix[row * unknowns + second] -= change;
                }
            }
        }
    }
}
