//! What does not change during a run, worked out once from the plan: gas
//! table, reactions, slabs with their grids, faces of each room, outside air,
//! initial state and scales.

use super::layout::{Account, ItemPlace, LOWER, Layout, UPPER};
use super::linings::{Leaf, RoomFace, Slab, leaves, slabs};
use crate::physics::combustion::{Formula, Reaction};
use crate::physics::gas::{self, GasTable};
use crate::physics::humidity;
use crate::physics::item::ItemModel;
use crate::physics::plume::Law;
use crate::physics::view_factor::parallel_rectangles;
use crate::plan::{
    Burning, Choices, Curve, Fuel, Item, Opening, PlacementRule, Plan, PlumeModel, Room, Space,
};
use thiserror::Error;

/// Layer guard: no layer is taken as thinner than this share of its room.
pub const LAYER_GUARD: f64 = 2e-3;

/// Share of the room that the upper layer has at ignition.
pub const START_LAYER: f64 = 4e-3;

/// Horizontal strips in which the walls of a room conduct.
pub const WALL_STRIPS: usize = 4;

/// Atmospheric pressure scale for the dynamic mean pressure, Pa.
const PRESSURE_SCALE: f64 = 1000.0;

/// A plan that the solver cannot take.
#[derive(Debug, Error, Clone, PartialEq)]
pub enum PlanFault {
    /// A fuel whose yields and formula do not go together.
    #[error("fuel \"{fuel}\": {fault}")]
    Fuel {
        /// Name.
        fuel: String,
        /// What is wrong.
        fault: String,
    },
    /// A lining that has no grid.
    #[error("lining \"{lining}\": {fault}")]
    Lining {
        /// Name.
        lining: String,
        /// What is wrong.
        fault: String,
    },
}

/// A room with what was worked out about it (named so that it is not taken for the plan's room).
#[derive(Debug, Clone)]
pub struct Hull {
    /// Volume, m3.
    pub volume: f64,
    /// Floor area, m2.
    pub area: f64,
    /// Height, m.
    pub height: f64,
    /// Width, m.
    pub width: f64,
    /// Length, m.
    pub length: f64,
    /// Floor above the reference level, m.
    pub floor_level: f64,
    /// View factor between ceiling and floor.
    pub ceiling_floor: f64,
    /// Slab faces that it sees.
    pub faces: Vec<RoomFace>,
    /// Mass of air at ignition, kg; scales the state.
    pub air_mass: f64,
    /// Temperature at ignition, K.
    pub start: f64,
}

/// An item with what was worked out about it.
#[derive(Debug, Clone)]
pub struct Source {
    /// Room.
    pub room: usize,
    /// Fuel index, also of its vapour.
    pub fuel: usize,
    /// Mirror number of its place.
    pub mirror: f64,
    /// Side of a burner's base as a diameter, m; `None` from the release.
    pub diameter: Option<f64>,
    /// Mass that can be given off, kg.
    pub mass: f64,
    /// True when it has clock, feedback and embers.
    pub growing: bool,
}

/// Everything fixed of a run.
#[derive(Debug, Clone)]
pub struct Building {
    /// Gas properties.
    pub gas: GasTable,
    /// Mass fractions of the outside air.
    pub air: Vec<f64>,
    /// Oxygen volume fraction of the outside air, wet.
    pub air_oxygen: f64,
    /// Outside temperature, K.
    pub air_temperature: f64,
    /// Outside density at the reference level, kg/m3.
    pub air_density: f64,
    /// Outside pressure, Pa.
    pub pressure: f64,
    /// Reactions, per fuel.
    pub reactions: Vec<Reaction>,
    /// Mass of oxygen atoms per mass of each species.
    pub oxygen_share: Vec<f64>,
    /// Mass of carbon atoms per mass of each species.
    pub carbon_share: Vec<f64>,
    /// Rooms.
    pub rooms: Vec<Hull>,
    /// Slabs.
    pub slabs: Vec<Slab>,
    /// Leaves of the openings.
    pub leaves: Vec<Leaf>,
    /// Items.
    pub items: Vec<Source>,
    /// Layout of the state.
    pub layout: Layout,
    /// Plume law.
    pub law: Law,
    /// Item model.
    pub model: ItemModel,
}

impl Building {
    /// Works out a building.
    ///
    /// # Errors
    /// A fuel or lining that cannot be used.
    pub fn new(plan: &Plan) -> Result<Self, PlanFault> {
        let vapours: Vec<_> = plan
            .fuels
            .iter()
            .map(|f| (f.vapour_molar_mass, f.vapour_heat_capacity))
            .collect();
        let gas = GasTable::new(&vapours);
        let open = &plan.open_air;
        let vapour = humidity::vapour_fraction(open.temperature, open.humidity, open.pressure);
        let air = gas::moist_air(vapour, gas.len());
        let air_density = open.pressure / (gas.mixture_gas_constant(&air) * open.temperature);
        let reactions = plan
            .fuels
            .iter()
            .map(reaction)
            .collect::<Result<Vec<_>, _>>()?;
        let (oxygen_share, carbon_share) = atom_shares(plan);
        let mut rooms: Vec<Hull> = plan.rooms.iter().map(space).collect();
        for room in &mut rooms {
            room.air_mass = room.volume * air_density;
        }
        let slabs = slabs(plan, &mut rooms)?;
        let leaves = leaves(plan, &slabs);
        let nodes: Vec<usize> = slabs.iter().map(|s| s.grid.capacity.len()).collect();
        let layout = Layout::new(
            rooms.len(),
            gas.len(),
            plan.items.len(),
            &nodes,
            plan.openings.len(),
        );
        let items = plan.items.iter().map(|i| source(i, plan)).collect();
        Ok(Self {
            air_oxygen: 0.2095 * (1.0 - vapour),
            air_temperature: open.temperature,
            pressure: open.pressure,
            law: match plan.choices.plume {
                PlumeModel::McCaffrey => Law::McCaffrey,
                PlumeModel::Heskestad => Law::Heskestad,
                PlumeModel::Zukoski => Law::Zukoski,
            },
            model: item_model(&plan.choices),
            gas,
            air,
            air_density,
            reactions,
            oxygen_share,
            carbon_share,
            rooms,
            slabs,
            leaves,
            items,
            layout,
        })
    }

    /// Heat stored in a slab above its start, J/m2.
    pub fn stored(&self, slab: usize, y: &[f64]) -> f64 {
        let start = self.slabs[slab].start;
        y[self.layout.slab(slab)]
            .iter()
            .zip(&self.slabs[slab].grid.capacity)
            .map(|(t, c)| c * (t - start))
            .sum()
    }

    /// State at ignition.
    pub fn initial_state(&self, plan: &Plan) -> Vec<f64> {
        let layout = &self.layout;
        let mut y = vec![0.0; layout.len()];
        let gas_constant = self.gas.mixture_gas_constant(&self.air);
        for (r, room) in self.rooms.iter().enumerate() {
            let density = self.pressure / (gas_constant * plan.rooms[r].temperature);
            let upper = START_LAYER * room.volume;
            y[layout.upper_volume(r)] = upper;
            for (layer, volume) in [(LOWER, room.volume - upper), (UPPER, upper)] {
                for (s, at) in layout.layer(r, layer).enumerate() {
                    y[at] = density * volume * self.air[s];
                }
            }
        }
        for (i, item) in self.items.iter().enumerate() {
            y[layout.item(i, ItemPlace::Mass)] = item.mass;
            y[layout.item(i, ItemPlace::Flamed)] = 1.0;
            y[layout.item(i, ItemPlace::Oxygen)] = self.air_oxygen;
        }
        for (s, slab) in self.slabs.iter().enumerate() {
            y[layout.slab(s)].fill(slab.start);
        }
        for (o, opening) in plan.openings.iter().enumerate() {
            y[layout.pane(o)] = pane_start(opening, plan);
        }
        y
    }

    /// Scales by which the integrator divides the state, so that one absolute
    /// tolerance fits all of it.
    pub fn scales(&self) -> Vec<f64> {
        let layout = &self.layout;
        let mut scale = vec![1.0; layout.len()];
        for (r, room) in self.rooms.iter().enumerate() {
            scale[layout.upper_volume(r)] = room.volume;
            scale[layout.jets(r)] = 1e6;
            scale[layout.turnover(r)] = 0.1;
            scale[layout.pressure(r)] = PRESSURE_SCALE;
            for layer in [LOWER, UPPER] {
                for at in layout.layer(r, layer) {
                    scale[at] = 0.2 * room.air_mass;
                }
            }
        }
        for (i, item) in self.items.iter().enumerate() {
            scale[layout.item(i, ItemPlace::Progress)] = 100.0;
            scale[layout.item(i, ItemPlace::Mass)] = item.mass.clamp(1.0, 1e6);
            scale[layout.item(i, ItemPlace::Oxygen)] = 0.2;
        }
        for s in 0..self.slabs.len() {
            scale[layout.slab(s)].fill(300.0);
        }
        for opening in 0..layout.panes() {
            scale[layout.pane(opening)] = 300.0;
        }
        let mass: f64 = self.rooms.iter().map(|r| r.air_mass).sum();
        for account in [
            Account::MassGained,
            Account::MassLost,
            Account::OxygenGained,
            Account::OxygenLost,
            Account::CarbonGained,
            Account::CarbonLost,
        ] {
            scale[layout.account(account)] = mass;
        }
        for account in [
            Account::EnergyGained,
            Account::EnergyLost,
            Account::HeatReleased,
        ] {
            scale[layout.account(account)] = mass * 1e6;
        }
        scale
    }
}

fn item_model(c: &Choices) -> ItemModel {
    ItemModel {
        flux_exponent: c.flux_exponent,
        clock_exponent: c.clock_exponent,
        feedback_cap: c.feedback_cap,
        respread_time: c.respread_time,
        flame_out_time: c.flame_out_time,
        ember_strength: c.ember_strength,
        smallest_flame: c.smallest_flame,
        ember_release: c.ember_release,
        charring_time: c.charring_time,
        ember_life: c.ember_life,
    }
}

fn reaction(fuel: &Fuel) -> Result<Reaction, PlanFault> {
    Reaction::new(
        formula(fuel),
        fuel.heat_of_combustion,
        fuel.co_yield,
        fuel.soot_yield,
    )
    .map_err(|fault| PlanFault::Fuel {
        fuel: fuel.name.clone(),
        fault: fault.to_string(),
    })
}

fn formula(fuel: &Fuel) -> Formula {
    Formula {
        c: fuel.carbon,
        h: fuel.hydrogen,
        o: fuel.oxygen,
        n: fuel.nitrogen,
    }
}

/// Atomic masses of carbon and oxygen, kg/mol (IUPAC 2021).
const CARBON: f64 = 12.011e-3;
const OXYGEN: f64 = 15.999e-3;

fn atom_shares(plan: &Plan) -> (Vec<f64>, Vec<f64>) {
    let m = gas::MOLAR_MASS;
    let mut oxygen = vec![
        0.0,
        1.0,
        2.0 * OXYGEN / m[gas::CO2],
        OXYGEN / m[gas::H2O],
        OXYGEN / m[gas::CO],
        0.0,
    ];
    let mut carbon = vec![
        0.0,
        0.0,
        CARBON / m[gas::CO2],
        0.0,
        CARBON / m[gas::CO],
        1.0,
    ];
    for fuel in &plan.fuels {
        let molar = formula(fuel).molar_mass();
        oxygen.push(fuel.oxygen * OXYGEN / molar);
        carbon.push(fuel.carbon * CARBON / molar);
    }
    (oxygen, carbon)
}

fn space(room: &Room) -> Hull {
    Hull {
        volume: room.volume(),
        area: room.floor_area(),
        height: room.height,
        width: room.width,
        length: room.length,
        floor_level: room.floor_level,
        ceiling_floor: parallel_rectangles(room.width, room.length, room.height),
        faces: Vec::new(),
        air_mass: 0.0,
        start: room.temperature,
    }
}

/// Mirror numbers of the weak placement rule: at a wall, in a corner. By the
/// measured room series (DOI 10.5281/zenodo.5703474), where corner and centre
/// fires hardly differ.
const WEAK_MIRROR: [f64; 2] = [1.2, 1.5];

fn source(item: &Item, plan: &Plan) -> Source {
    let fuel = &plan.fuels[item.fuel.0];
    let (peak, diameter, growing) = match &item.burning {
        Burning::Growing(curve) => (curve_peak(curve), None, true),
        Burning::AsGiven(curve) => (curve_peak(curve), None, false),
        Burning::Burner { rate, side, .. } => {
            // Diameter of the circle with the area of the square.
            (
                *rate,
                Some(side * (4.0 / std::f64::consts::PI).sqrt()),
                false,
            )
        }
    };
    let base = diameter.unwrap_or_else(|| base_diameter(peak, fuel.release_per_area));
    let full = match (plan.choices.placement, item.in_corner) {
        (PlacementRule::None, _) => 1.0,
        (PlacementRule::Weak, false) => WEAK_MIRROR[0],
        (PlacementRule::Weak, true) => WEAK_MIRROR[1],
        (PlacementRule::Image, false) => 2.0,
        (PlacementRule::Image, true) => 4.0,
    };
    let near = item.gap_to_wall.map_or(0.0, |gap| {
        1.0 - crate::physics::smooth::smoothstep(gap / base.max(0.1))
    });
    Source {
        room: item.room.0,
        fuel: item.fuel.0,
        mirror: 1.0 + (full - 1.0) * near,
        diameter,
        mass: if item.mass.is_finite() {
            item.mass * (1.0 - fuel.residue_share)
        } else {
            1e9
        },
        growing,
    }
}

/// Diameter of a round base that releases `power` (W) at `per_area` (W/m2), m.
pub fn base_diameter(power: f64, per_area: f64) -> f64 {
    (4.0 * power.max(0.0) / (std::f64::consts::PI * per_area)).sqrt()
}

fn curve_peak(curve: &Curve) -> f64 {
    match curve {
        Curve::Growth { peak, .. } => *peak,
        Curve::Table(points) => points.iter().map(|p| p.1).fold(0.0, f64::max),
    }
}

/// Temperature of a pane at ignition, K: half way between the room and the
/// other side.
fn pane_start(opening: &Opening, plan: &Plan) -> f64 {
    let temperature = |space| match space {
        Space::Room(room) => plan.rooms[room.0].temperature,
        Space::OpenAir => plan.open_air.temperature,
    };
    0.5 * (temperature(opening.from) + temperature(opening.to))
}
