//! One evaluation of the whole model: from time and state to the rates of
//! change. Pure in time and state but for the start of the pressure balance,
//! which affects nothing beyond its tolerance. Allocates nothing.

use super::building::Building;
use super::burning::{self, ItemRates, burn};
use super::changes::Changes;
use super::heat::{self, RoomRadiation};
use super::layers::Layers;
use super::layout::{Account, ItemPlace, LOWER, UPPER};
use super::pressure::{Balance, Problem, TightGroup};
use super::schedule::{Schedule, stand};
use crate::physics::extinction::{burning_factor, limiting_oxygen};
use crate::physics::gas::{FIRST_FUEL, O2};
use crate::physics::glass;
use crate::physics::smooth::{min8, smoothstep};
use crate::plan::{FanKind, Plan};
use nalgebra::Vector4;

/// Mass fraction of fuel at which burning in jets is half stopped for want of
/// fuel in the receiving layer; keeps the lagged heat from taking fuel that is
/// not there (own choice).
const JET_FUEL: f64 = 2e-4;

/// The same for oxygen.
const JET_OXYGEN: f64 = 5e-3;

/// Lit fuel leaving at which the whole release of the room begins to count for
/// the flame outside, W (own choice).
const FLAMES_OUTSIDE: f64 = 100e3;

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
    changes: Changes,
    fluxes: Vec<[f64; 2]>,
    neighbours: Vec<f64>,
    extra: Vec<Vector4<f64>>,
    pilot: Vec<f64>,
    mean_pressure: Vec<f64>,
    group_pressure: Vec<f64>,
    losses: heat::Losses,
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
        self.balance
            .solve(&Problem {
                building: self.building,
                openings: &self.plan.openings,
                fans: &self.plan.fans,
                choices: &self.plan.choices,
                layers: &self.layers,
                changes: &self.changes,
                groups: &self.groups,
                group_pressure: &self.group_pressure,
            })
            .map_err(|_| Refusal::Pressure)?;
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

    /// Heat that leaves with opening leaves, W; negative when they bring it
    /// back.
    fn heat_of_leaves(&self, time: f64, y: &[f64]) -> f64 {
        let mut lost = 0.0;
        for leaf in &self.building.leaves {
            let opening = &self.plan.openings[leaf.opening];
            let rate = self.schedule.widening(leaf.opening, time) / opening.width;
            if rate != 0.0 {
                lost += leaf.area * rate * self.building.stored(leaf.slab, y);
            }
        }
        lost
    }

    /// Heat that leaves at a moment with leaves that jump open, J; negative when
    /// they jump shut.
    pub fn heat_of_jumps(&self, time: f64, y: &[f64]) -> f64 {
        let mut lost = 0.0;
        for leaf in &self.building.leaves {
            let (o, width) = (leaf.opening, self.plan.openings[leaf.opening].width);
            let open = |clear: f64| (clear / width).clamp(0.0, 1.0);
            let jump = open(self.schedule.clear_width(o, time))
                - open(self.schedule.clear_width_before(o, time));
            if jump != 0.0 {
                lost += leaf.area * jump * self.building.stored(leaf.slab, y);
            }
        }
        lost
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

    /// Flame factor of a layer for the fuel vapours it carries.
    fn flame_factor(&self, layer: usize) -> f64 {
        let gas = &self.layers.layers[layer];
        let vapours = &self.layers.fractions(layer)[FIRST_FUEL..];
        let (mut sum, mut limit) = (1e-12, 1e-12 * 0.135);
        for (fuel, y) in self.plan.fuels.iter().zip(vapours) {
            sum += y.max(0.0);
            limit += y.max(0.0) * fuel.limiting_oxygen;
        }
        let choices = &self.plan.choices;
        let limit = limiting_oxygen(
            limit / sum,
            choices.critical_flame_temperature,
            gas.temperature,
        );
        burning_factor(gas.oxygen, limit, choices.limit_width)
    }

    /// Burns the lagged heat of the jets in the upper layer that they enter.
    fn burn_jets_in(&mut self, room: usize, y: &[f64]) -> f64 {
        let wanted = y[self.building.layout.jets(room)].max(0.0);
        if wanted <= 0.0 {
            return 0.0;
        }
        let upper = 2 * room + UPPER;
        let fractions = self.layers.fractions(upper);
        let reactions = &self.building.reactions;
        let oxygen = fractions[O2].max(0.0);
        let heat_of = |f: usize| fractions[FIRST_FUEL + f].max(0.0) * reactions[f].heat;
        let fuel: f64 = fractions[FIRST_FUEL..].iter().map(|y| y.max(0.0)).sum();
        let heat: f64 = (0..reactions.len()).map(heat_of).sum();
        if heat <= 0.0 {
            return 0.0;
        }
        let power = wanted * fuel / (fuel + JET_FUEL) * oxygen / (oxygen + JET_OXYGEN);
        for (f, reaction) in reactions.iter().enumerate() {
            burn(
                &mut self.changes,
                upper,
                reaction,
                f,
                power * heat_of(f) / heat,
            );
        }
        power
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
        for (room, mixing) in self.balance.mixing.iter().enumerate() {
            let (l, u) = (2 * room + LOWER, 2 * room + UPPER);
            let layers = &self.layers.layers;
            let (up, down) = (
                mixing.exchange * layers[l].density,
                mixing.exchange * layers[u].density,
            );
            self.changes.transfer(&self.layers, l, u, up);
            self.changes.transfer(&self.layers, u, l, down);
        }
    }

    /// What the jets could burn, towards which their lagged heat moves.
    fn burn_in_jets(&mut self, y: &[f64], dy: &mut [f64]) {
        let layout = &self.building.layout;
        let lag = self.plan.choices.jet_lag;
        for room in 0..self.building.rooms.len() {
            dy[layout.jets(room)] = -y[layout.jets(room)] / lag;
        }
        for o in 0..self.balance.passages.len() {
            self.outside[o] = 0.0;
            for direction in 0..2 {
                let (fuel, oxygen) = self.jet(o, direction);
                if fuel <= 0.0 {
                    continue;
                }
                match self.balance.passages[o].rooms()[1 - direction] {
                    Some(room) => dy[layout.jets(room)] += min8(fuel, oxygen) / lag,
                    None => self.outside[o] += fuel,
                }
            }
        }
    }

    /// Heat of the lit fuel in a stream, and heat that the oxygen it meets can
    /// release, W.
    fn jet(&self, opening: usize, direction: usize) -> (f64, f64) {
        let passage = &self.balance.passages[opening];
        let stream = &passage.streams[direction];
        let source = passage.source(direction);
        let into = passage.destination(direction);
        let (mut fuel, mut oxygen, mut need) = (0.0, 0.0, 0.0);
        let Some(room) = passage.rooms()[direction] else {
            return (0.0, 0.0);
        };
        for (k, from) in source.into_iter().enumerate() {
            let flow = stream.of_layer(k);
            if flow <= 0.0 {
                continue;
            }
            let gas = &self.layers.layers[from];
            let own = burning::own_ignition(&self.plan.choices, gas.temperature);
            let pilot = if k == UPPER { self.pilot[room] } else { 0.0 };
            let lit = 1.0 - (1.0 - own) * (1.0 - pilot);
            if lit <= 0.0 {
                continue;
            }
            let fractions = self.layers.fractions(from);
            for (f, reaction) in self.building.reactions.iter().enumerate() {
                let rate = flow * fractions[FIRST_FUEL + f].max(0.0);
                fuel += lit * rate * reaction.heat;
                need += lit * rate * reaction.oxygen;
            }
            oxygen += self.flame_factor(from) * flow * fractions[O2].max(0.0);
        }
        if need <= 0.0 {
            return (0.0, 0.0);
        }
        oxygen += stream.lifted * self.layers.fractions(into[LOWER])[O2].max(0.0);
        (fuel, oxygen * fuel / need)
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

    /// Heat released everywhere, W.
    pub fn heat_released(&self) -> f64 {
        self.items.iter().map(|i| i.burned).sum::<f64>()
            + self.in_layers.iter().sum::<f64>()
            + self.in_jets.iter().sum::<f64>()
    }

    /// Heat release that counts for the flame outside an opening, W: that of the
    /// room behind it and of the lit fuel that leaves, once such fuel leaves.
    pub fn release_behind(&self, opening: usize) -> f64 {
        let outside = self.outside[opening];
        let rooms = self.balance.passages[opening].rooms();
        let (Some(room), true) = (rooms[0].or(rooms[1]), outside > 0.0) else {
            return 0.0;
        };
        let items = self.items.iter().zip(&self.building.items);
        let inside = items
            .filter(|(_, source)| source.room == room)
            .map(|(rates, _)| rates.burned)
            .sum::<f64>()
            + self.in_layers[room]
            + self.in_jets[room];
        outside + inside * outside / (outside + FLAMES_OUTSIDE)
    }

    /// Flow of outside air into the building, kg/s.
    pub fn air_in(&self) -> f64 {
        self.balance
            .passages
            .iter()
            .map(|p| match p.rooms() {
                [None, _] => p.streams[0].total(),
                [_, None] => p.streams[1].total(),
                _ => 0.0,
            })
            .sum()
    }

    fn keep_ledger(&self, time: f64, y: &[f64], dy: &mut [f64]) {
        let layout = &self.building.layout;
        let outside = self.layers.outside();
        let air = self.layers.layers[outside];
        let inflow = self.air_in();
        // The outside collects outflow less inflow.
        let net = self.changes.species(outside);
        let oxygen = &self.building.oxygen_share;
        let carbon = &self.building.carbon_share;
        let fractions = self.layers.fractions(outside);
        let dot = super::layers::dot;
        let mut set = |account, value| dy[layout.account(account)] = value;
        let (mut mass, mut o, mut c) = (0.0, 0.0, 0.0);
        for (item, source) in self.items.iter().zip(&self.building.items) {
            let rate = item.given_off / self.building.reactions[source.fuel].heat;
            mass += rate;
            o += rate * oxygen[FIRST_FUEL + source.fuel];
            c += rate * carbon[FIRST_FUEL + source.fuel];
        }
        set(Account::MassGained, inflow + mass);
        set(Account::MassLost, net.iter().sum::<f64>() + inflow);
        set(Account::OxygenGained, inflow * dot(fractions, oxygen) + o);
        set(
            Account::OxygenLost,
            dot(net, oxygen) + inflow * dot(fractions, oxygen),
        );
        set(Account::CarbonGained, inflow * dot(fractions, carbon) + c);
        set(
            Account::CarbonLost,
            dot(net, carbon) + inflow * dot(fractions, carbon),
        );
        let released = self.heat_released();
        set(Account::HeatReleased, released);
        set(Account::EnergyGained, released + inflow * air.enthalpy);
        set(
            Account::EnergyLost,
            self.changes.enthalpy(outside)
                + inflow * air.enthalpy
                + self.losses.radiation
                + self.losses.backs
                + self.heat_of_leaves(time, y),
        );
    }
}
