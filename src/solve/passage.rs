//! Ways through which gas passes: upright and horizontal openings and fans,
//! with what they take from the layers of one side and give to those of the
//! other.

use super::layers::Layers;
use super::layout::{LOWER, UPPER};
use super::pressure::Problem;
use super::schedule::Stand;
use crate::physics::exchange::horizontal_regularised;
use crate::physics::fan::curve as fan_curve;
use crate::physics::opening_flow::{
    Band, Bands, GRAVITY, MOST_BANDS, REGULARISATION, Side, bands_regularised,
};
use crate::physics::plume::buoyant_entrainment;
use crate::physics::smooth::smoothstep;
use crate::plan::{Fan, FanKind, Opening, Space};

/// Temperature step over which inflow turns from the lower to the upper
/// layer, K.
const DEPOSIT_STEP: f64 = 10.0;

/// Exponent with which entrainment by a jet goes with its flow at one
/// temperature: 1/3 far from its opening, 0.6 near it.
const JET_EXPONENT: f64 = 0.45;

/// Depth that stands for the band of a horizontal opening or a fan, m; only its
/// place matters.
const LYING_DEPTH: f64 = 1e-3;

/// Area of the mouth of a duct, m2 (own choice; only its speed counts).
const DUCT_MOUTH: f64 = 0.25;

/// Band about the interface in which an intake draws from both layers, m (own
/// choice).
const INTAKE_BAND: f64 = 0.3;

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

/// What a passage is: an index into the plan's openings or fans.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Way {
    /// An opening.
    Opening(usize),
    /// A fan.
    Fan(usize),
}

/// An opening or a fan in one evaluation.
#[derive(Debug, Clone)]
pub struct Passage {
    /// What it is.
    pub way: Way,
    /// How it stands; of a fan only the clear width of its opening.
    pub stand: Stand,
    /// How far a fan runs, 0..1.
    pub running: f64,
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
    pub regularisation: f64,
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
    pub fn of_opening(index: usize, opening: &Opening, outside: usize) -> Self {
        Self::between(Way::Opening(index), opening.from, opening.to, outside)
    }

    /// A passage for a fan of the plan.
    pub fn of_fan(index: usize, fan: &Fan, openings: &[Opening], outside: usize) -> Self {
        let (from, to) = match fan.kind {
            FanKind::Duct { from, to, .. } => (from, to),
            FanKind::PositivePressure { opening, .. } => {
                let opening = &openings[opening.0];
                match opening.from {
                    Space::OpenAir => (opening.from, opening.to),
                    Space::Room(_) => (opening.to, opening.from),
                }
            }
        };
        Self::between(Way::Fan(index), from, to, outside)
    }

    fn between(way: Way, from: Space, to: Space, outside: usize) -> Self {
        let layers = |space| match space {
            Space::Room(room) => [2 * room.0 + LOWER, 2 * room.0 + UPPER],
            Space::OpenAir => [outside; 2],
        };
        let room = |space| match space {
            Space::Room(room) => Some(room.0),
            Space::OpenAir => None,
        };
        Self {
            way,
            sides: [layers(from), layers(to)],
            rooms: [room(from), room(to)],
            stand: Stand::default(),
            running: 0.0,
            streams: Default::default(),
            bands: Bands::default(),
            growth: Default::default(),
            deposit: Default::default(),
            regularisation: REGULARISATION,
            parts: Default::default(),
        }
    }

    /// True when nothing can pass.
    pub fn is_closed(&self) -> bool {
        match self.way {
            Way::Opening(_) => self.stand.coefficient_width <= 0.0,
            Way::Fan(_) => self.running <= 0.0,
        }
    }

    /// Clear area, m2: of an opening, of the cone of a fan; of a duct that of a
    /// mouth of a quarter of a square metre.
    pub fn clear_area(&self, problem: &Problem<'_>) -> f64 {
        let upright = |o: &Opening| self.stand.clear_width * (o.head - o.sill);
        match self.way {
            Way::Opening(o) if problem.openings[o].kind.is_horizontal() => {
                let opening = &problem.openings[o];
                opening.area * (self.stand.clear_width / opening.width).clamp(0.0, 1.0)
            }
            Way::Opening(o) => upright(&problem.openings[o]),
            Way::Fan(f) => match problem.fans[f].kind {
                FanKind::PositivePressure { opening, covers } => {
                    covers * upright(&problem.openings[opening.0])
                }
                FanKind::Duct { .. } => DUCT_MOUTH,
            },
        }
    }

    /// Takes everything away that passed.
    pub fn clear(&mut self) {
        self.streams = Default::default();
        self.bands = Bands::default();
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
    pub fn prepare(&mut self, layers: &Layers) {
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

impl Passage {
    /// Datum of the heights: the floor of the first room at hand, m.
    fn datum(&self, problem: &Problem<'_>) -> f64 {
        self.rooms[0]
            .or(self.rooms[1])
            .map_or(0.0, |room| problem.building.rooms[room].floor_level)
    }

    fn side(&self, problem: &Problem<'_>, which: usize, trial: &[f64], wind: f64) -> Side {
        let air = problem.building.air_density;
        let datum = self.datum(problem);
        match self.rooms[which] {
            None => Side {
                pressure: wind - air * GRAVITY * datum,
                interface: 0.0,
                density: [air; 2],
            },
            Some(room) => {
                let [l, u] = self.sides[which];
                let density = [l, u].map(|k| problem.layers.layers[k].density);
                let level = problem.building.rooms[room].floor_level;
                let above = level - datum;
                Side {
                    pressure: trial[room] - air * GRAVITY * level + density[0] * GRAVITY * above,
                    interface: problem.layers.interface[room] + above,
                    density,
                }
            }
        }
    }

    /// Streams at the trial pressures.
    pub fn flow(&mut self, problem: &Problem<'_>, trial: &[f64]) {
        let wind = match self.way {
            Way::Opening(o) => problem.openings[o].wind_pressure,
            Way::Fan(_) => 0.0,
        };
        let first = self.side(problem, 0, trial, wind);
        let second = self.side(problem, 1, trial, wind);
        self.bands = match self.way {
            Way::Opening(o) if problem.openings[o].kind.is_horizontal() => {
                self.lying(problem, &problem.openings[o], &first, &second)
            }
            Way::Opening(o) => bands_regularised(
                &first,
                &second,
                problem.openings[o].sill,
                problem.openings[o].head,
                self.stand.coefficient_width,
                self.regularisation,
            ),
            Way::Fan(f) => self.driven(problem, &problem.fans[f], &first, &second),
        };
        self.streams = Default::default();
        for direction in 0..2 {
            let interface = if direction == 0 {
                second.interface
            } else {
                first.interface
            };
            self.gather(problem, direction, interface);
        }
    }

    /// Density of what is drawn from a layer of a side, kg/m3: a layer that is
    /// all but gone gives the other's gas, and the volume is what counts.
    fn drawn_density(&self, problem: &Problem<'_>, side: usize, layer: usize) -> f64 {
        let [own, other] = [layer, 1 - layer].map(|k| &problem.layers.layers[self.sides[side][k]]);
        let weight = own.available;
        1.0 / (weight / own.density + (1.0 - weight) / other.density)
    }

    /// Bands of a horizontal opening: what the pressure drives one way, and
    /// the buoyant exchange both ways.
    fn lying(&self, problem: &Problem<'_>, opening: &Opening, below: &Side, above: &Side) -> Bands {
        let height = opening.head;
        let area = self.stand.coefficient_width / opening.coefficient;
        let low = self.drawn_density(problem, 0, UPPER);
        let high = self.drawn_density(problem, 1, LOWER);
        let difference = below.pressure_at(height) - above.pressure_at(height);
        let flow = horizontal_regularised(
            area,
            opening.coefficient,
            opening.exchange_factor,
            difference,
            [low, high],
            self.regularisation,
        );
        let mut bands = Bands::default();
        let band = |forward: bool, flow: f64, slope: f64| Band {
            bottom: height - LYING_DEPTH,
            top: height,
            forward,
            from_upper: forward,
            flow,
            slope,
            peak_difference: difference.abs(),
        };
        let up = flow.driven.max(0.0);
        let down = (-flow.driven).max(0.0);
        // Without a difference the slope is steepest and must go one way, or
        // the balance has none.
        let (rising, falling) = if flow.driven >= 0.0 {
            (flow.slope, 0.0)
        } else {
            (0.0, flow.slope)
        };
        bands.push(band(false, high * (down + flow.exchange), high * falling));
        bands.push(band(true, low * (up + flow.exchange), low * rising));
        bands
    }

    /// Bands of a fan: its net curve at the pressure that it works against.
    fn driven(&self, problem: &Problem<'_>, fan: &Fan, first: &Side, second: &Side) -> Bands {
        let datum = self.datum(problem);
        let height = |side: usize, above_floor: f64| {
            let level = self.rooms[side].map_or(datum, |r| problem.building.rooms[r].floor_level);
            above_floor + level - datum
        };
        let (intake, outlet, open) = match fan.kind {
            FanKind::Duct { intake, outlet, .. } => (height(0, intake), height(1, outlet), 1.0),
            FanKind::PositivePressure { opening, .. } => {
                let opening = &problem.openings[opening.0];
                let middle = 0.5 * (opening.sill + opening.head);
                (
                    middle,
                    middle,
                    (self.stand.clear_width / opening.width).clamp(0.0, 1.0),
                )
            }
        };
        let air = problem.building.air_density;
        // Gauge pressures against the open air at the same height, so that the
        // weight of the air in a duct does not count.
        let gauge = |side: &Side, z: f64| side.pressure_at(z) + air * GRAVITY * (z + datum);
        let against = gauge(second, outlet) - gauge(first, intake);
        let curve = fan_curve(fan.free_flow, fan.dead_end_pressure, against);
        let upper = smoothstep((intake - first.interface) / INTAKE_BAND + 0.5);
        let mut bands = Bands::default();
        for (from_upper, share) in [(false, 1.0 - upper), (true, upper)] {
            let density = self.drawn_density(problem, 0, usize::from(from_upper));
            let scale = density * share * self.running * open;
            bands.push(Band {
                bottom: outlet - LYING_DEPTH,
                top: outlet,
                forward: true,
                from_upper,
                flow: scale * curve.flow,
                slope: scale * curve.slope,
                peak_difference: 0.0,
            });
        }
        bands
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
    pub fn add_to_balance(
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
            let slope = if band.forward {
                band.slope
            } else {
                -band.slope
            };
            let (from, to) = (self.rooms[direction], self.rooms[1 - direction]);
            let [lifts, drags] = self.streams[direction].slopes;
            let [up, down] = to.map_or([0.0; 2], |room| internal[room]);
            let jet = 1.0 - self.stand.leak_share;
            let (mut out, mut gain) = (0.0, 0.0);
            for (k, from) in source.into_iter().enumerate() {
                let drawn = slope * part.drawn[k];
                let growth = self.growth[direction][k];
                let raised = part.raised[k];
                let deposit = jet * self.deposit[direction][k];
                out -= drawn / layers.layers[from].density;
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
