//! Burning in the jets of openings: what they could burn, and the lagged heat
//! that burns in the layer they enter.

use super::burning::{self, burn};
use super::derivative::Model;
use super::layout::{LOWER, UPPER};
use crate::physics::extinction::{burning_factor, limiting_oxygen};
use crate::physics::gas::{FIRST_FUEL, O2};
use crate::physics::smooth::min8;

/// Mass fraction of fuel at which burning in jets is half stopped for want of
/// fuel in the receiving layer; keeps the lagged heat from taking fuel that is
/// not there (own choice).
const JET_FUEL: f64 = 2e-4;

/// The same for oxygen.
const JET_OXYGEN: f64 = 5e-3;

impl Model<'_> {
    /// Flame factor of a layer for the fuel vapours it carries.
    pub(super) fn flame_factor(&self, layer: usize) -> f64 {
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
    pub(super) fn burn_jets_in(&mut self, room: usize, y: &[f64]) -> f64 {
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

    /// What the jets could burn, towards which their lagged heat moves.
    pub(super) fn burn_in_jets(&mut self, y: &[f64], dy: &mut [f64]) {
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
    pub(super) fn jet(&self, opening: usize, direction: usize) -> (f64, f64) {
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
}
