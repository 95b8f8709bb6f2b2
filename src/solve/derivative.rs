//! One evaluation of the whole model: from time and state to the rates of
//! change. Pure in time and state but for the start of the pressure balance,
//! which affects nothing beyond its tolerance. Allocates nothing.

use super::building::Building;
use super::burning::{self, ItemRates};
use super::changes::Changes;
use super::heat::{self, RoomRadiation};
use super::layers::Layers;
use super::layout::{ItemPlace, LOWER, UPPER};
use super::pressure::{Balance, Problem, TightGroup};
use super::schedule::{Schedule, stand};
use crate::physics::glass;
use crate::physics::mixing;
use crate::physics::smooth::smoothstep;
use crate::plan::{FanKind, Plan};
use nalgebra::Vector4;

/// Lag of mixing by momentum, s: a stream needs some seconds to stir a room,
/// and the pressures must not hang on it (own choice).
const MIXING_LAG: f64 = 2.0;

/// Time in which a room whose upper layer is denser than its lower one turns
/// over, s (own choice).
const OVERTURN: f64 = 10.0;

/// Why an evaluation was refused.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Refusal {
    /// The state is beyond all bounds (a trial step too far).
    State,
    /// The pressures could not be balanced.
    Pressure,
}

/// The model of one run with its working memory.
pub struct Model<'a> {
    /// The plan.
    pub plan: &'a Plan,
    /// What is fixed.
    pub building: &'a Building,
    /// Openings and fans over time.
    pub schedule: Schedule,
    /// Tight groups of the present stretch.
    pub groups: Vec<TightGroup>,
    /// Layers of the last evaluation.
    pub layers: Layers,
    /// Pressures and flows of the last evaluation.
    pub balance: Balance,
    /// Items of the last evaluation.
    pub items: Vec<ItemRates>,
    /// Radiation of the last evaluation.
    pub radiation: Vec<RoomRadiation>,
    /// Heat released in layers, W per room.
    pub in_layers: Vec<f64>,
    /// Heat released in jets, W per room.
    pub in_jets: Vec<f64>,
    /// Heat that fuel going to the open air could release, W per opening.
    pub outside: Vec<f64>,
    /// Areas of the slabs with their shut leaves, m2.
    pub areas: Vec<f64>,
    /// Evaluations that touched a guard.
    pub guards: u64,
    /// The last refusal.
    pub refusal: Option<Refusal>,
    pub(super) changes: Changes,
    pub(super) fluxes: Vec<[f64; 2]>,
    pub(super) neighbours: Vec<f64>,
    pub(super) extra: Vec<Vector4<f64>>,
    pub(super) pilot: Vec<f64>,
    pub(super) mixed: Vec<f64>,
    pub(super) exchange: Vec<f64>,
    pub(super) mean_pressure: Vec<f64>,
    pub(super) group_pressure: Vec<f64>,
    pub(super) losses: heat::Losses,
}

impl<'a> Model<'a> {
    /// A model with its working memory.
    pub fn new(plan: &'a Plan, building: &'a Building) -> Self {
        let n = building.rooms.len();
        Self {
            plan,
            building,
            schedule: Schedule::new(plan),
            groups: Vec::with_capacity(n),
            layers: Layers::new(building),
            balance: Balance::new(building, &plan.openings, &plan.fans),
            items: vec![ItemRates::default(); plan.items.len()],
            radiation: Vec::with_capacity(n),
            in_layers: vec![0.0; n],
            in_jets: vec![0.0; n],
            outside: vec![0.0; plan.openings.len() + plan.fans.len()],
            guards: 0,
            refusal: None,
            changes: Changes::new(building),
            areas: building.slabs.iter().map(|s| s.area).collect(),
            fluxes: vec![[0.0; 2]; building.slabs.len()],
            neighbours: vec![0.0; n],
            extra: vec![Vector4::zeros(); n],
            pilot: vec![0.0; n],
            mixed: vec![0.0; n],
            exchange: vec![0.0; n],
            mean_pressure: vec![0.0; n],
            group_pressure: Vec::with_capacity(n),
            losses: heat::Losses::default(),
        }
    }

    /// Tight group of a room.
    pub fn group_of(&self, room: usize) -> Option<usize> {
        self.groups.iter().position(|g| g.rooms.contains(&room))
    }

    /// What the heat functions need to see.
    pub fn heat_scene<'b>(&'b self, y: &'b [f64]) -> heat::Scene<'b> {
        heat::Scene {
            building: self.building,
            openings: &self.plan.openings,
            choices: &self.plan.choices,
            layers: &self.layers,
            areas: &self.areas,
            y,
        }
    }

    /// Rates of change `dy` of the state `y` at `time`.
    ///
    /// # Errors
    /// A state beyond all bounds, or pressures that cannot be balanced.
    pub fn evaluate(&mut self, time: f64, y: &[f64], dy: &mut [f64]) -> Result<(), Refusal> {
        let outcome = self.rates(time, y, dy);
        self.refusal = outcome.err();
        outcome
    }

    fn rates(&mut self, time: f64, y: &[f64], dy: &mut [f64]) -> Result<(), Refusal> {
        dy.fill(0.0);
        self.read_pressures(y);
        if !self.layers.read(self.building, y, &self.mean_pressure) {
            return Err(Refusal::State);
        }
        self.guards += u64::from(self.layers.guarded);
        self.set_passages(time);
        self.set_leaves();
        self.changes.clear();
        self.burn_items(time, y);
        self.exchange_heat(y, dy);
        self.burn_layers(y);
        self.overturn();
        self.mix(y);
        let problem = Problem {
            building: self.building,
            openings: &self.plan.openings,
            fans: &self.plan.fans,
            mixed: &self.mixed,
            choices: &self.plan.choices,
            layers: &self.layers,
            changes: &self.changes,
            groups: &self.groups,
            group_pressure: &self.group_pressure,
        };
        self.balance
            .solve(&problem)
            .map_err(|_| Refusal::Pressure)?;
        let layout = &self.building.layout;
        for room in 0..self.building.rooms.len() {
            let (share, turnover) = self.balance.mixing(&problem, room);
            dy[layout.mixed(room)] = (share - y[layout.mixed(room)]) / MIXING_LAG;
            dy[layout.turnover(room)] = (turnover - y[layout.turnover(room)]) / MIXING_LAG;
        }
        self.move_gas();
        self.burn_in_jets(y, dy);
        self.heat_panes(y, dy);
        self.fill(dy);
        self.keep_ledger(time, y, dy);
        Ok(())
    }

    /// Areas of the slabs with the leaves that are shut.
    fn set_leaves(&mut self) {
        for (area, slab) in self.areas.iter_mut().zip(&self.building.slabs) {
            *area = slab.area;
        }
        for leaf in &self.building.leaves {
            let opening = &self.plan.openings[leaf.opening];
            let open = self.balance.passages[leaf.opening].stand.clear_width / opening.width;
            self.areas[leaf.slab] += leaf.area * (1.0 - open).clamp(0.0, 1.0);
        }
    }

    fn read_pressures(&mut self, y: &[f64]) {
        self.mean_pressure.fill(0.0);
        self.group_pressure.clear();
        for group in &self.groups {
            let pressure = y[self.building.layout.pressure(group.rooms[0])];
            self.group_pressure.push(pressure);
            for &room in &group.rooms {
                self.mean_pressure[room] = pressure;
            }
        }
    }

    /// How openings stand and fans run at a time. A fan's cone takes its share
    /// of the doorway.
    fn set_passages(&mut self, time: f64) {
        let passages = &mut self.balance.passages;
        for (o, opening) in self.plan.openings.iter().enumerate() {
            passages[o].stand = stand(opening, self.schedule.clear_width(o, time));
        }
        let openings = self.plan.openings.len();
        for (f, fan) in self.plan.fans.iter().enumerate() {
            let running = self.schedule.running(f, time);
            passages[openings + f].running = running;
            if let FanKind::PositivePressure { opening, covers } = fan.kind {
                let o = opening.0;
                passages[openings + f].stand = passages[o].stand;
                let taken = covers
                    * running
                    * self.plan.openings[o].coefficient
                    * passages[o].stand.clear_width;
                passages[o].stand.coefficient_width -= taken;
            }
        }
    }

    fn burn_items(&mut self, time: f64, y: &[f64]) {
        self.radiation.clear();
        for room in 0..self.building.rooms.len() {
            let quiet = self.heat_scene(y).quiet_room(&self.balance.passages, room);
            self.radiation.push(quiet);
        }
        self.pilot.fill(0.0);
        for index in 0..self.plan.items.len() {
            let room = self.building.items[index].room;
            let floor = self.radiation[room].quiet[crate::physics::enclosure::FLOOR];
            let rates = burning::item(
                self.building,
                self.plan,
                &self.layers,
                &mut self.changes,
                index,
                time,
                y,
                floor,
            );
            self.pilot[room] = self.pilot[room].max(rates.pilot);
            self.items[index] = rates;
        }
    }

    fn exchange_heat(&mut self, y: &[f64], dy: &mut [f64]) {
        let scene = heat::Scene {
            building: self.building,
            openings: &self.plan.openings,
            choices: &self.plan.choices,
            layers: &self.layers,
            areas: &self.areas,
            y,
        };
        let passages = &self.balance.passages;
        scene.flames(&mut self.radiation, &self.plan.items, &self.items);
        scene.between_rooms(
            &mut self.radiation,
            passages,
            &mut self.neighbours,
            &mut self.extra,
        );
        self.losses.radiation = 0.0;
        for room in 0..self.building.rooms.len() {
            self.losses.radiation += scene.room(
                &self.radiation[room],
                passages,
                room,
                self.neighbours[room],
                &mut self.fluxes,
                &mut self.changes,
            );
        }
        self.losses.backs = scene.conduct(&mut self.fluxes, dy);
    }

    fn burn_layers(&mut self, y: &[f64]) {
        for room in 0..self.building.rooms.len() {
            self.in_layers[room] = 0.0;
            for layer in [LOWER, UPPER] {
                let index = 2 * room + layer;
                let gas = &self.layers.layers[index];
                let own = burning::own_ignition(&self.plan.choices, gas.temperature);
                let lit = if layer == UPPER && self.pilot[room] > 0.0 {
                    self.pilot[room] * self.flame_factor(index)
                } else {
                    0.0
                };
                self.in_layers[room] += burning::in_layer(
                    self.building,
                    self.plan,
                    &self.layers,
                    &mut self.changes,
                    index,
                    1.0 - (1.0 - own) * (1.0 - lit),
                );
            }
            self.in_jets[room] = self.burn_jets_in(room, y);
        }
    }

    /// A room whose upper layer is denser than its lower one turns over: equal
    /// volumes change places.
    fn overturn(&mut self) {
        for room in 0..self.building.rooms.len() {
            let (l, u) = (2 * room + LOWER, 2 * room + UPPER);
            let (low, up) = (self.layers.layers[l], self.layers.layers[u]);
            let inverted = smoothstep((low.temperature - up.temperature) / 5.0);
            if inverted > 0.0 {
                let volume =
                    inverted * low.available * up.available * low.volume.min(up.volume) / OVERTURN;
                self.changes
                    .transfer(&self.layers, l, u, volume * low.density);
                self.changes
                    .transfer(&self.layers, u, l, volume * up.density);
            }
        }
    }

    /// Layers that momentum mixes change places in equal volumes, by the lagged
    /// share and turnover.
    fn mix(&mut self, y: &[f64]) {
        let layout = &self.building.layout;
        for room in 0..self.building.rooms.len() {
            let share = y[layout.mixed(room)].clamp(0.0, 1.0);
            let turnover = y[layout.turnover(room)].max(0.0);
            self.mixed[room] = share;
            let (l, u) = (2 * room + LOWER, 2 * room + UPPER);
            let (low, up) = (self.layers.layers[l], self.layers.layers[u]);
            let thin = low.volume.min(up.volume);
            let exchange = low.available
                * up.available
                * mixing::exchange_rate(thin, share, 1.0 / turnover.max(1e-9));
            self.exchange[room] = exchange;
            self.changes
                .transfer(&self.layers, l, u, exchange * low.density);
            self.changes
                .transfer(&self.layers, u, l, exchange * up.density);
        }
    }

    fn move_gas(&mut self) {
        for passage in &self.balance.passages {
            for direction in 0..2 {
                let stream = &passage.streams[direction];
                let source = passage.source(direction);
                let into = passage.destination(direction);
                for (from, flows) in source.into_iter().zip(stream.flow) {
                    for (into, flow) in into.into_iter().zip(flows) {
                        self.changes.transfer(&self.layers, from, into, flow);
                    }
                }
                let [l, u] = into;
                self.changes.transfer(&self.layers, l, u, stream.lifted);
                self.changes.transfer(&self.layers, u, l, stream.dragged);
            }
        }
    }

    /// Glass heated by the layers and surfaces of the room behind it.
    fn heat_panes(&self, y: &[f64], dy: &mut [f64]) {
        for (o, opening) in self.plan.openings.iter().enumerate() {
            let Some(pane) = &opening.pane else { continue };
            let rooms = self.balance.passages[o].rooms();
            let Some(room) = rooms[0].or(rooms[1]) else {
                continue;
            };
            let interface = self.layers.interface[room];
            let above = heat::share_above(opening.sill, opening.head, interface);
            let gas = [LOWER, UPPER].map(|k| self.layers.layers[2 * room + k].temperature);
            let place = self.building.layout.pane(o);
            dy[place] = glass::pane_rate(
                &glass::Pane {
                    thickness: pane.thickness,
                    density: pane.density,
                    heat_capacity: pane.heat_capacity,
                    emissivity: pane.emissivity,
                },
                y[place],
                gas,
                above,
                self.radiation[room].at_wall(above),
                self.building.air_temperature,
            );
        }
    }

    fn fill(&mut self, dy: &mut [f64]) {
        let layout = &self.building.layout;
        for (g, group) in self.groups.iter().enumerate() {
            dy[layout.pressure(group.rooms[0])] = self.balance.group_rate(g);
        }
        for room in 0..self.building.rooms.len() {
            let upper = 2 * room + UPPER;
            let gas = &self.layers.layers[upper];
            let squeeze = self
                .groups
                .iter()
                .position(|g| g.rooms.contains(&room))
                .map_or(0.0, |g| self.balance.group_rate(g))
                * gas.volume
                * (1.0 - gas.gas_constant / gas.heat_capacity)
                / self.layers.pressure[room];
            dy[layout.upper_volume(room)] =
                self.changes.growth(self.building, &self.layers, upper) - squeeze;
            for layer in [LOWER, UPPER] {
                dy[layout.layer(room, layer)]
                    .copy_from_slice(self.changes.species(2 * room + layer));
            }
        }
        for (i, item) in self.items.iter().enumerate() {
            for (place, rate) in [
                ItemPlace::Progress,
                ItemPlace::Mass,
                ItemPlace::Flamed,
                ItemPlace::Embers,
                ItemPlace::Oxygen,
            ]
            .into_iter()
            .zip(item.rates)
            {
                dy[layout.item(i, place)] = rate;
            }
        }
    }
}
