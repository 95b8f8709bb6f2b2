//! The gas of every layer, read from the state.

use super::building::{Building, LAYER_GUARD};
use super::layout::{LOWER, UPPER};
use crate::physics::gas::{GAS_CONSTANT, O2};
use crate::physics::smooth::smoothstep;

/// Widest temperature a layer may have, K; beyond it the state is rejected.
const TEMPERATURE_BOUNDS: (f64, f64) = (100.0, 4000.0);

/// One layer. Index `2 * room + layer`; the outside air stands last.
#[derive(Debug, Clone, Copy, Default)]
pub struct Layer {
    /// Temperature, K.
    pub temperature: f64,
    /// Volume, m3.
    pub volume: f64,
    /// Mass, kg.
    pub mass: f64,
    /// Density, kg/m3.
    pub density: f64,
    /// Gas constant, J/kg/K.
    pub gas_constant: f64,
    /// Heat capacity, J/kg/K.
    pub heat_capacity: f64,
    /// Sensible enthalpy at its own temperature, J/kg.
    pub enthalpy: f64,
    /// Oxygen volume fraction, wet.
    pub oxygen: f64,
    /// Availability of a layer as a donor, 0 (vanishing) to 1.
    pub available: f64,
}

/// All layers of a state with their mass fractions and species enthalpies.
#[derive(Debug, Clone)]
#[allow(clippy::struct_field_names)] // "layers" is the trade's word for what it holds.
pub struct Layers {
    /// Layers, the outside air last.
    pub layers: Vec<Layer>,
    /// Mass fractions, `species` a layer.
    fractions: Vec<f64>,
    /// Species enthalpies at each layer's temperature, J/kg.
    enthalpies: Vec<f64>,
    /// Interface heights above each room's floor, m.
    pub interface: Vec<f64>,
    /// Absolute pressure used in each room's gas law, Pa.
    pub pressure: Vec<f64>,
    species: usize,
    /// A guard was touched.
    pub guarded: bool,
}

impl Layers {
    /// Room for all layers of a building.
    pub fn new(building: &Building) -> Self {
        let count = 2 * building.rooms.len() + 1;
        let species = building.gas.len();
        let mut out = Self {
            layers: vec![Layer::default(); count],
            fractions: vec![0.0; count * species],
            enthalpies: vec![0.0; count * species],
            interface: vec![0.0; building.rooms.len()],
            pressure: vec![building.pressure; building.rooms.len()],
            species,
            guarded: false,
        };
        let outside = count - 1;
        let at = outside * species;
        out.fractions[at..].copy_from_slice(&building.air);
        let cp = building.gas.enthalpies(
            building.air_temperature,
            &building.air,
            &mut out.enthalpies[at..],
        );
        let gas_constant = building.gas.mixture_gas_constant(&building.air);
        out.layers[outside] = Layer {
            temperature: building.air_temperature,
            volume: f64::INFINITY,
            mass: f64::INFINITY,
            density: building.air_density,
            gas_constant,
            heat_capacity: cp,
            enthalpy: dot(&building.air, &out.enthalpies[at..]),
            oxygen: building.air_oxygen,
            available: 1.0,
        };
        out
    }

    /// Index of the outside air.
    pub fn outside(&self) -> usize {
        self.layers.len() - 1
    }

    /// Mass fractions of a layer.
    pub fn fractions(&self, layer: usize) -> &[f64] {
        &self.fractions[layer * self.species..(layer + 1) * self.species]
    }

    /// Species enthalpies at a layer's temperature, J/kg.
    pub fn enthalpies(&self, layer: usize) -> &[f64] {
        &self.enthalpies[layer * self.species..(layer + 1) * self.species]
    }

    /// Reads the layers from a state whose rooms are at the given mean
    /// pressures (gauge, Pa). False when the state is beyond all bounds.
    pub fn read(&mut self, building: &Building, y: &[f64], mean_pressure: &[f64]) -> bool {
        self.guarded = false;
        for (r, room) in building.rooms.iter().enumerate() {
            let guard = LAYER_GUARD * room.volume;
            let raw = y[building.layout.upper_volume(r)];
            // Half the guard: trial stages may dip below the guard a little
            // without meaning anything.
            let upper = raw.clamp(0.5 * guard, room.volume - 0.5 * guard);
            self.guarded |= upper != raw;
            self.pressure[r] = building.pressure + mean_pressure[r];
            self.interface[r] = (room.volume - upper) / room.area;
            for (k, volume) in [(LOWER, room.volume - upper), (UPPER, upper)] {
                let masses = &y[building.layout.layer(r, k)];
                if !self.read_layer(building, 2 * r + k, masses, volume, room.volume) {
                    return false;
                }
            }
        }
        true
    }

    fn read_layer(
        &mut self,
        building: &Building,
        index: usize,
        masses: &[f64],
        volume: f64,
        room_volume: f64,
    ) -> bool {
        let mass: f64 = masses.iter().sum();
        let inverse = building.gas.inverse_molar_mass();
        let moles = dot(masses, inverse);
        if !(mass > 0.0 && moles > 0.0) {
            return false;
        }
        let temperature = self.pressure[index / 2] * volume / (moles * GAS_CONSTANT);
        if !(temperature > TEMPERATURE_BOUNDS.0 && temperature < TEMPERATURE_BOUNDS.1) {
            return false;
        }
        let at = index * self.species;
        let fractions = &mut self.fractions[at..at + self.species];
        for (y, m) in fractions.iter_mut().zip(masses) {
            *y = m / mass;
        }
        let enthalpies = &mut self.enthalpies[at..at + self.species];
        let cp = building.gas.enthalpies(temperature, masses, enthalpies);
        self.layers[index] = Layer {
            temperature,
            volume,
            mass,
            density: mass / volume,
            gas_constant: GAS_CONSTANT * moles / mass,
            heat_capacity: cp,
            enthalpy: dot(fractions, enthalpies),
            oxygen: (masses[O2] * inverse[O2] / moles).max(0.0),
            available: smoothstep((volume / room_volume - LAYER_GUARD) / (4.0 * LAYER_GUARD)),
        };
        true
    }

    /// Growth of a layer's volume per kg of gas that enters it from another
    /// layer, m3/kg, at the room's pressure.
    pub fn growth(&self, from: usize, into: usize) -> f64 {
        let source = &self.layers[from];
        let layer = &self.layers[into];
        let excess = source.enthalpy - dot(self.fractions(from), self.enthalpies(into));
        (layer.temperature * source.gas_constant
            + layer.gas_constant / layer.heat_capacity * excess)
            / self.pressure[into / 2]
    }
}

/// Scalar product.
pub fn dot(a: &[f64], b: &[f64]) -> f64 {
    a.iter().zip(b).map(|(x, y)| x * y).sum()
}
