//! Heat between gas, flames, linings and the next space: radiation by the
//! enclosure method, convection, wall-cooled downflow, conduction.

use super::building::Building;
use super::burning::ItemRates;
use super::changes::Changes;
use super::layers::{Layers, dot};
use super::layout::{LOWER, UPPER};
use super::linings::Face;
use super::passage::Passage;
use crate::physics::conduction;
use crate::physics::emissivity::{layer_emissivity, mean_beam_length};
use crate::physics::enclosure::{
    self, CEILING, Enclosure, FLOOR, LOWER_WALL, Shape, UPPER_WALL, black, point_shares,
};
use crate::physics::gas::{CO2, H2O, SOOT};
use crate::physics::smooth::smoothstep;
use crate::plan::{Choices, Item, Opening};
use nalgebra::Vector4;

/// Depth over which convection to a surface fades with a vanishing layer, m.
const THIN_LAYER: f64 = 0.02;

/// Standard atmosphere, Pa.
const ATMOSPHERE: f64 = 101_325.0;

/// Regularisation of the wall-cooled downflow where the layers are alike, K.
const ALIKE: f64 = 20.0;

/// Radiation of one room in one evaluation.
#[derive(Debug, Clone)]
pub struct RoomRadiation {
    shape: Shape,
    enclosure: Enclosure,
    /// Emissivity of the upper layer.
    pub emissivity: f64,
    /// Irradiation without flames, W/m2.
    pub quiet: Vector4<f64>,
    /// Irradiation with flames and exchange between rooms, W/m2.
    pub whole: Vector4<f64>,
    /// Radiative area over the sum of the parts, for the two walls.
    stretch: [f64; 2],
    flames: f64,
}

impl RoomRadiation {
    /// Irradiation of a part of the wall, W/m2, whose given share lies above
    /// the interface.
    pub fn at_wall(&self, above: f64) -> f64 {
        self.whole[UPPER_WALL] * above + self.whole[LOWER_WALL] * (1.0 - above)
    }
}

/// Heat lost across the boundary in one evaluation, W.
#[derive(Debug, Clone, Copy, Default)]
pub struct Losses {
    /// Radiation to the open air.
    pub radiation: f64,
    /// Through the backs of linings.
    pub backs: f64,
}

/// Share of a stretch of height that lies above the interface.
pub fn share_above(bottom: f64, top: f64, interface: f64) -> f64 {
    ((top - interface.max(bottom)) / (top - bottom)).clamp(0.0, 1.0)
}

/// Sums of a wall's parts in the radiation balance.
#[derive(Debug, Clone, Copy, Default)]
struct Parts {
    area: f64,
    emission: f64,
    reflection: f64,
}

impl Parts {
    fn add(&mut self, area: f64, emission: f64, reflection: f64) {
        self.area += area;
        self.emission += area * emission;
        self.reflection += area * reflection;
    }

    fn face(&self) -> enclosure::Face {
        enclosure::Face {
            emission: self.emission / self.area,
            reflection: self.reflection / self.area,
        }
    }
}

/// The surroundings that the functions of this file share.
pub struct Scene<'a> {
    /// The building.
    pub building: &'a Building,
    /// Openings of the plan.
    pub openings: &'a [Opening],
    /// Coefficients.
    pub choices: &'a Choices,
    /// Layers.
    pub layers: &'a Layers,
    /// Areas of the slabs with their shut leaves, m2.
    pub areas: &'a [f64],
    /// The state.
    pub y: &'a [f64],
}

impl Scene<'_> {
    fn surface(&self, slab: usize, back: bool) -> f64 {
        let nodes = &self.y[self.building.layout.slab(slab)];
        if back {
            nodes[nodes.len() - 1]
        } else {
            nodes[0]
        }
    }

    fn above(&self, opening: &Opening, room: usize, first: usize) -> f64 {
        // Heights of an opening are given above the floor of its first room.
        let shift = self.building.rooms[first].floor_level - self.building.rooms[room].floor_level;
        share_above(
            opening.sill + shift,
            opening.head + shift,
            self.layers.interface[room],
        )
    }

    /// Sets up a room's radiation and its irradiation without flames.
    pub fn quiet_room(&self, passages: &[Passage], room: usize) -> RoomRadiation {
        let hull = &self.building.rooms[room];
        let interface = self.layers.interface[room];
        let shape = enclosure::shape(
            hull.width,
            hull.length,
            hull.height,
            interface,
            hull.ceiling_floor,
        );
        let upper = 2 * room + UPPER;
        let gas = &self.layers.layers[upper];
        let fractions = self.layers.fractions(upper);
        let inverse = self.building.gas.inverse_molar_mass();
        let moles = dot(fractions, inverse);
        let share = |s: usize| (fractions[s] * inverse[s] / moles).max(0.0);
        let bound = 2.0 * hull.area + shape.area[UPPER_WALL];
        let emissivity = layer_emissivity(
            gas.temperature,
            share(CO2),
            share(H2O),
            (fractions[SOOT] * gas.density).max(0.0),
            mean_beam_length(gas.volume, bound),
            self.layers.pressure[room] / ATMOSPHERE,
        );
        let mut faces = [enclosure::Face::default(); 4];
        let walls = self.parts(passages, room, &mut faces);
        faces[UPPER_WALL] = walls[0].face();
        faces[LOWER_WALL] = walls[1].face();
        let enclosure = Enclosure::new(&shape, &faces, emissivity, black(gas.temperature));
        let quiet = enclosure.irradiation();
        RoomRadiation {
            stretch: [
                shape.area[UPPER_WALL] / walls[0].area,
                shape.area[LOWER_WALL] / walls[1].area,
            ],
            shape,
            enclosure,
            emissivity,
            quiet,
            whole: quiet,
            flames: 0.0,
        }
    }

    /// Parts of the two walls; ceiling and floor go straight into `faces`.
    fn parts(
        &self,
        passages: &[Passage],
        room: usize,
        faces: &mut [enclosure::Face; 4],
    ) -> [Parts; 2] {
        let interface = self.layers.interface[room];
        // A trace of area keeps the shares defined where no lining is left.
        let trace = Parts {
            area: 1e-9,
            emission: 0.0,
            reflection: 1e-9,
        };
        let mut walls = [trace; 2];
        for f in &self.building.rooms[room].faces {
            let slab = &self.building.slabs[f.slab];
            let emission = slab.emissivity * black(self.surface(f.slab, f.back));
            let reflection = 1.0 - slab.emissivity;
            match f.face {
                Face::Ceiling(_) => {
                    faces[CEILING] = enclosure::Face {
                        emission,
                        reflection,
                    }
                }
                Face::Floor(_) => {
                    faces[FLOOR] = enclosure::Face {
                        emission,
                        reflection,
                    }
                }
                Face::Wall { bottom, top, .. } => {
                    let above = share_above(bottom, top, interface);
                    let area = self.areas[f.slab];
                    walls[0].add(area * above, emission, reflection);
                    walls[1].add(area * (1.0 - above), emission, reflection);
                }
                Face::Behind(_) => {}
            }
        }
        for (opening, passage) in self.openings.iter().zip(passages) {
            let area = passage.stand.clear_width * (opening.head - opening.sill);
            let rooms = passage.rooms();
            if area <= 0.0 || !rooms.contains(&Some(room)) {
                continue;
            }
            let above = self.above(opening, room, rooms[0].or(rooms[1]).unwrap_or(room));
            let (emission, reflection) = if rooms.contains(&None) {
                (black(self.building.air_temperature), 0.0)
            } else {
                (0.0, 1.0)
            };
            walls[0].add(area * above, emission, reflection);
            walls[1].add(area * (1.0 - above), emission, reflection);
        }
        walls
    }

    /// Adds the flames of the items to the irradiation of their rooms.
    pub fn flames(&self, radiation: &mut [RoomRadiation], items: &[Item], rates: &[ItemRates]) {
        for (item, rate) in items.iter().zip(rates) {
            if rate.radiated <= 0.0 {
                continue;
            }
            let room = item.room.0;
            let hull = &self.building.rooms[room];
            let interface = self.layers.interface[room];
            let source = (item.surface_height + 0.5 * rate.flame_height)
                .clamp(0.02 * hull.height, 0.9 * hull.height);
            let shares = point_shares(hull.width, hull.length, hull.height, interface, source);
            let this = &mut radiation[room];
            let inside = ((source - interface) / (hull.height - interface)).clamp(0.0, 1.0);
            let clear_up = 1.0 - this.emissivity;
            let clear_down = 1.0 - this.emissivity * inside;
            let clear = [clear_up, clear_up, clear_down, clear_down];
            let incident =
                Vector4::from_fn(|i, _| rate.radiated * shares[i] * clear[i] / this.shape.area[i]);
            this.whole += this.enclosure.of_incident(&incident);
            this.flames += rate.radiated;
        }
    }

    /// Radiation between rooms through open openings: each opening passes on
    /// the difference of what falls on it from both sides, and the rooms'
    /// irradiation is mended for it. Gives the net loss of each room to its
    /// neighbours through `loss`, W.
    pub fn between_rooms(
        &self,
        radiation: &mut [RoomRadiation],
        passages: &[Passage],
        loss: &mut [f64],
        extra: &mut [Vector4<f64>],
    ) {
        loss.fill(0.0);
        extra.fill(Vector4::zeros());
        let mut any = false;
        for (opening, passage) in self.openings.iter().zip(passages) {
            let [Some(a), Some(b)] = passage.rooms() else {
                continue;
            };
            let area = passage.stand.clear_width * (opening.head - opening.sill);
            if area <= 0.0 {
                continue;
            }
            let above = [self.above(opening, a, a), self.above(opening, b, a)];
            let net = area * (radiation[a].at_wall(above[0]) - radiation[b].at_wall(above[1]));
            any = true;
            for (room, share, sign) in [(a, above[0], 1.0), (b, above[1], -1.0)] {
                loss[room] += sign * net;
                let shape = &radiation[room].shape;
                extra[room][UPPER_WALL] -= sign * net * share / shape.area[UPPER_WALL];
                extra[room][LOWER_WALL] -= sign * net * (1.0 - share) / shape.area[LOWER_WALL];
            }
        }
        if any {
            for (room, extra) in radiation.iter_mut().zip(extra.iter()) {
                room.whole += room.enclosure.of_emission(extra);
            }
        }
    }

    /// Heat of radiation and convection into gas and linings of a room: books
    /// the gas, fills the face fluxes (W/m2, `[front, back]` per slab), gives
    /// the radiation lost to the open air, W.
    pub fn room(
        &self,
        radiation: &RoomRadiation,
        passages: &[Passage],
        room: usize,
        neighbours_loss: f64,
        fluxes: &mut [[f64; 2]],
        changes: &mut Changes,
    ) -> f64 {
        let hull = &self.building.rooms[room];
        let interface = self.layers.interface[room];
        let (lower, upper) = (2 * room + LOWER, 2 * room + UPPER);
        let temperature = [lower, upper].map(|k| self.layers.layers[k].temperature);
        let thin = |depth: f64| depth / (depth + THIN_LAYER);
        let h = [
            self.choices.convection_lower * thin(interface),
            self.choices.convection_upper * thin(hull.height - interface),
        ];
        let mut to_surfaces = 0.0;
        let mut convected = [0.0; 2];
        let mut upper_wall = [0.0; 3];
        for f in &hull.faces {
            let slab = &self.building.slabs[f.slab];
            let area = self.areas[f.slab];
            let surface = self.surface(f.slab, f.back);
            let above = match f.face {
                Face::Ceiling(_) => 1.0,
                Face::Wall { bottom, top, .. } => share_above(bottom, top, interface),
                _ => 0.0,
            };
            let parts = [
                (1.0 - above) * h[LOWER] * (temperature[LOWER] - surface),
                above * h[UPPER] * (temperature[UPPER] - surface),
            ];
            convected[LOWER] += area * parts[LOWER];
            convected[UPPER] += area * parts[UPPER];
            let own = black(surface);
            let radiant = slab.emissivity
                * match f.face {
                    Face::Ceiling(_) => radiation.whole[CEILING] - own,
                    Face::Wall { .. } => {
                        upper_wall[0] += area * above;
                        upper_wall[1] += area * above * surface;
                        upper_wall[2] += area * parts[UPPER];
                        above * radiation.stretch[0] * (radiation.whole[UPPER_WALL] - own)
                            + (1.0 - above)
                                * radiation.stretch[1]
                                * (radiation.whole[LOWER_WALL] - own)
                    }
                    _ => radiation.whole[FLOOR] - own,
                };
            to_surfaces += area * radiant;
            fluxes[f.slab][usize::from(f.back)] = parts[LOWER] + parts[UPPER] + radiant;
        }
        let outside = self.to_open_air(radiation, passages, room);
        changes.heat(
            upper,
            radiation.flames - to_surfaces - outside - neighbours_loss - convected[UPPER],
        );
        changes.heat(lower, -convected[LOWER]);
        self.downflow(room, upper_wall, changes);
        outside
    }

    fn to_open_air(&self, radiation: &RoomRadiation, passages: &[Passage], room: usize) -> f64 {
        let sky = black(self.building.air_temperature);
        let mut lost = 0.0;
        for (opening, passage) in self.openings.iter().zip(passages) {
            let rooms = passage.rooms();
            if !(rooms.contains(&None) && rooms.contains(&Some(room))) {
                continue;
            }
            let area = passage.stand.clear_width * (opening.head - opening.sill);
            if area <= 0.0 {
                continue;
            }
            let above = self.above(opening, room, room);
            lost += area
                * (above * radiation.stretch[0] * (radiation.whole[UPPER_WALL] - sky)
                    + (1.0 - above) * radiation.stretch[1] * (radiation.whole[LOWER_WALL] - sky));
        }
        lost
    }

    /// Gas cooled at the upper walls runs down into the lower layer. The heat
    /// that it gave to the wall on its way is part of the convection already
    /// taken from the upper layer, so it goes down with what is left.
    fn downflow(&self, room: usize, [area, moment, convected]: [f64; 3], changes: &mut Changes) {
        let (lower, upper) = (2 * room + LOWER, 2 * room + UPPER);
        let gas = &self.layers.layers;
        let between = gas[upper].temperature - gas[lower].temperature;
        if area <= 0.0 || convected <= 0.0 || between <= 0.0 {
            return;
        }
        let to_wall = (gas[upper].temperature - moment / area).max(0.0);
        let even = between * between + ALIKE * ALIKE;
        let share = (to_wall * between / even).min(1.0);
        let flow = self.choices.downflow_factor
            * gas[upper].available
            * smoothstep(between / 10.0)
            * share
            * convected
            * between
            / (gas[upper].heat_capacity * even);
        // Heat given up between the temperatures of the two layers; the gas must
        // not arrive colder than the layer that it joins.
        let at_lower = dot(self.layers.fractions(upper), self.layers.enthalpies(lower));
        let given = flow * (gas[upper].enthalpy - at_lower);
        changes.transfer(self.layers, upper, lower, flow);
        changes.heat(lower, -given);
        changes.heat(upper, given);
    }

    /// Conduction in all slabs: fills the node rates, K/s, and gives the heat
    /// lost through backs, W. Also fills the back fluxes.
    pub fn conduct(&self, fluxes: &mut [[f64; 2]], rates: &mut [f64]) -> f64 {
        let mut lost = 0.0;
        for (s, slab) in self.building.slabs.iter().enumerate() {
            if let Face::Behind(temperature) = slab.faces[1] {
                let flux = self.choices.convection_behind * (temperature - self.surface(s, true));
                fluxes[s][1] = flux;
                lost -= flux * self.areas[s];
            }
            let at = self.building.layout.slab(s);
            conduction::rates(
                &slab.grid,
                &self.y[at.clone()],
                fluxes[s][0],
                fluxes[s][1],
                &mut rates[at],
            );
        }
        lost
    }

    /// Radiation on the floor less what a surface at the room's starting
    /// temperature would send back, W/m2.
    pub fn floor_flux(&self, radiation: &RoomRadiation, room: usize) -> f64 {
        radiation.whole[FLOOR] - black(self.building.rooms[room].start)
    }

    /// Mean surface temperatures of ceiling, wall above, wall below, floor, K.
    pub fn surface_temperatures(&self, room: usize) -> [f64; 4] {
        let interface = self.layers.interface[room];
        let mut sums = [[0.0_f64; 2]; 4];
        for f in &self.building.rooms[room].faces {
            let area = self.areas[f.slab];
            let surface = self.surface(f.slab, f.back);
            let mut add = |which: usize, share: f64| {
                sums[which][0] += area * share;
                sums[which][1] += area * share * surface;
            };
            match f.face {
                Face::Ceiling(_) => add(CEILING, 1.0),
                Face::Floor(_) => add(FLOOR, 1.0),
                Face::Wall { bottom, top, .. } => {
                    let above = share_above(bottom, top, interface);
                    add(UPPER_WALL, above);
                    add(LOWER_WALL, 1.0 - above);
                }
                Face::Behind(_) => {}
            }
        }
        sums.map(|[area, moment]| if area > 0.0 { moment / area } else { f64::NAN })
    }
}
