//! What changes in every layer during one evaluation: species and enthalpy
//! that come and go, and from them the growth of its volume.

use super::building::Building;
use super::layers::{Layers, dot};

/// Accumulated rates of change of all layers; the outside air stands last and
/// collects what crosses the boundary (with its sign: gain of the outside).
#[derive(Debug, Clone)]
pub struct Changes {
    species: Vec<f64>,
    enthalpy: Vec<f64>,
    width: usize,
}

impl Changes {
    /// Zero changes for a building.
    pub fn new(building: &Building) -> Self {
        let count = 2 * building.rooms.len() + 1;
        Self {
            species: vec![0.0; count * building.gas.len()],
            enthalpy: vec![0.0; count],
            width: building.gas.len(),
        }
    }

    /// Starts over.
    pub fn clear(&mut self) {
        self.species.fill(0.0);
        self.enthalpy.fill(0.0);
    }

    /// Species rates of a layer, kg/s.
    pub fn species(&self, layer: usize) -> &[f64] {
        &self.species[layer * self.width..(layer + 1) * self.width]
    }

    /// Species rates of a layer, kg/s, to be added to.
    pub fn species_mut(&mut self, layer: usize) -> &mut [f64] {
        &mut self.species[layer * self.width..(layer + 1) * self.width]
    }

    /// Enthalpy rate of a layer, W: flows at their own enthalpy, heat and heat
    /// of reaction.
    pub fn enthalpy(&self, layer: usize) -> f64 {
        self.enthalpy[layer]
    }

    /// Adds heat to a layer, W.
    pub fn heat(&mut self, layer: usize, power: f64) {
        self.enthalpy[layer] += power;
    }

    /// Moves gas (kg/s) from one layer to another with its enthalpy.
    pub fn transfer(&mut self, layers: &Layers, from: usize, into: usize, flow: f64) {
        if flow == 0.0 || from == into {
            return;
        }
        let fractions = layers.fractions(from);
        for (s, y) in fractions.iter().enumerate() {
            let rate = flow * y;
            self.species[from * self.width + s] -= rate;
            self.species[into * self.width + s] += rate;
        }
        let power = flow * layers.layers[from].enthalpy;
        self.enthalpy[from] -= power;
        self.enthalpy[into] += power;
    }

    /// Growth of a layer's volume at constant pressure, m3/s.
    pub fn growth(&self, building: &Building, layers: &Layers, layer: usize) -> f64 {
        let gas = &layers.layers[layer];
        let species = self.species(layer);
        let moles = dot(species, building.gas.inverse_molar_mass());
        let excess = self.enthalpy[layer] - dot(species, layers.enthalpies(layer));
        (gas.temperature * crate::physics::gas::GAS_CONSTANT * moles
            + gas.gas_constant / gas.heat_capacity * excess)
            / layers.pressure[layer / 2]
    }
}
