//! Burning over the items and in the layers: releases, heat, and what they do
//! to the gas. Flows through openings are not needed here.

use super::building::{Building, base_diameter};
use super::changes::Changes;
use super::layers::Layers;
use super::layout::{ItemPlace, LOWER, UPPER};
use crate::physics::combustion::Reaction;
use crate::physics::enclosure::black;
use crate::physics::extinction::{burning_factor, limiting_oxygen};
use crate::physics::gas::{CO, CO2, FIRST_FUEL, H2O, N2, O2, SOOT};
use crate::physics::growth::{burn_out, t_squared};
use crate::physics::item::{
    Fire, Surroundings, clock_rate, fire_rates, lower_share, release_factors,
};
use crate::physics::plume::{entrainment, flame_height, mirrored};
use crate::physics::smooth::{min8, smoothstep, window};
use crate::plan::{Burning, Choices, Curve, Fuel, Item, Plan};

/// Heat released per kg of air, J/kg, for the air that a flame needs at its
/// base (13.1 MJ per kg of oxygen, Huggett 1980, 23.1 % oxygen by mass).
pub const HEAT_PER_AIR: f64 = 3.03e6;

/// Flamed share at which gas given off without flame is half burned by the
/// flames beside it (own choice).
const NEIGHBOUR_FLAME: f64 = 0.05;

/// Share of its mass over which an item that burns as given fades out when the
/// curve asks for more than there is (own choice).
const LAST: f64 = 0.01;

/// Band above the flame tip over which it still lights the layer, m (own choice).
const PILOT_BAND: f64 = 0.5;

/// What an item does at one moment.
#[derive(Debug, Clone, Copy, Default)]
pub struct ItemRates {
    /// Free release at its progress, W.
    pub free: f64,
    /// Heat of what is given off, W.
    pub given_off: f64,
    /// Heat released at the item, W.
    pub burned: f64,

    /// Flame height, m.
    pub flame_height: f64,
    /// Share of base air from the lower layer.
    pub lower_share: f64,
    /// Entrainment of the plume from the lower layer, kg/s.
    pub plume: f64,
    /// Radiated power, W.
    pub radiated: f64,
    /// Strength with which its flame lights the layer, 0..1.
    pub pilot: f64,
    /// Rates of progress, mass, flamed share, embers, oxygen breathed.
    pub rates: [f64; 5],
}

/// Free heat release of a curve at a time on its own clock, W.
pub fn free_release(curve: &Curve, clock: f64) -> f64 {
    let t = clock.max(0.0);
    match curve {
        Curve::Growth { alpha, peak } => t_squared(*alpha, *peak, t),
        Curve::Table(points) => table(points, t),
    }
}

fn table(points: &[(f64, f64)], t: f64) -> f64 {
    let next = points.partition_point(|p| p.0 <= t);
    match (next.checked_sub(1).map(|i| points[i]), points.get(next)) {
        (Some((t0, q0)), Some((t1, q1))) => q0 + (q1 - q0) * (t - t0) / (t1 - t0),
        (Some((t0, q0)), None) if t <= t0 => q0,
        _ => 0.0,
    }
}

/// Adds the burning of `power` W of fuel `vapour` (index) to a layer.
pub fn burn(changes: &mut Changes, layer: usize, reaction: &Reaction, vapour: usize, power: f64) {
    let rate = power / reaction.heat;
    let species = changes.species_mut(layer);
    species[FIRST_FUEL + vapour] -= rate;
    species[O2] -= rate * reaction.oxygen;
    species[CO2] += rate * reaction.carbon_dioxide;
    species[H2O] += rate * reaction.water;
    species[CO] += rate * reaction.carbon_monoxide;
    species[SOOT] += rate * reaction.soot;
    species[N2] += rate * reaction.nitrogen;
    changes.heat(layer, power);
}

/// Everything about one item that the evaluation needs.
struct Scene<'a> {
    building: &'a Building,
    choices: &'a Choices,
    fuel: &'a Fuel,
    reaction: &'a Reaction,
    layers: &'a Layers,
    item: usize,
}

impl Scene<'_> {
    fn limit(&self, temperature: f64) -> f64 {
        limiting_oxygen(
            self.fuel.limiting_oxygen,
            self.choices.critical_flame_temperature,
            temperature,
        )
    }

    fn flame_factor(&self, oxygen: f64, temperature: f64) -> f64 {
        burning_factor(oxygen, self.limit(temperature), self.choices.limit_width)
    }

    fn diameter(&self, power: f64) -> f64 {
        self.building.items[self.item]
            .diameter
            .unwrap_or_else(|| base_diameter(power, self.fuel.release_per_area))
    }

    fn plume(&self, power: f64, rise: f64) -> f64 {
        let source = &self.building.items[self.item];
        self.choices.plume_factor
            * mirrored(source.mirror, power, self.diameter(power), |q, d| {
                entrainment(
                    self.building.law,
                    q,
                    self.fuel.radiative_fraction,
                    d,
                    rise.max(0.0),
                )
            })
    }
}

/// Reckons one item and books its burning in the layers. `floor_irradiation` is
/// the radiation on the floor without flames, W/m2.
#[allow(clippy::too_many_arguments)]
pub fn item(
    building: &Building,
    plan: &Plan,
    layers: &Layers,
    changes: &mut Changes,
    index: usize,
    time: f64,
    y: &[f64],
    floor_irradiation: f64,
) -> ItemRates {
    let item = &plan.items[index];
    if time < item.ignition {
        return ItemRates::default();
    }
    let source = &building.items[index];
    let scene = Scene {
        building,
        choices: &plan.choices,
        fuel: &plan.fuels[source.fuel],
        reaction: &building.reactions[source.fuel],
        layers,
        item: index,
    };
    let place = |p| y[building.layout.item(index, p)];
    let (lower, upper) = (2 * source.room + LOWER, 2 * source.room + UPPER);
    let (low, up) = (&layers.layers[lower], &layers.layers[upper]);
    let interface = layers.interface[source.room];
    let rise = (interface - item.surface_height).max(0.0);
    let fire = Fire {
        flamed: place(ItemPlace::Flamed),
        embers: place(ItemPlace::Embers),
    };
    let oxygen = place(ItemPlace::Oxygen);
    let free = free(item, plan, building, index, time, y);

    // The base's share of air from the lower layer follows from what the item
    // would offer with the oxygen it breathes now.
    let ratio = oxygen / building.air_oxygen;
    let offered =
        free * fire.flamed.clamp(0.0, 1.0) * if source.growing { ratio * ratio } else { 1.0 };
    let needed = plan.choices.base_air * offered / HEAT_PER_AIR;
    let share = lower_share(scene.plume(offered, rise), needed) * low.available;
    let zone_oxygen = share * low.oxygen + (1.0 - share) * up.oxygen;
    let zone_temperature = share * low.temperature + (1.0 - share) * up.temperature;
    let ambient = black(building.rooms[source.room].start);
    let around = Surroundings {
        oxygen_ratio: ratio,
        oxygen: oxygen.max(0.0),
        flame_factor: scene.flame_factor(oxygen, zone_temperature),
        hot_ignition: window(
            zone_temperature,
            plan.choices.autoignition_start,
            plan.choices.autoignition_full,
        ),
        flux: share * floor_irradiation + (1.0 - share) * black(up.temperature) - ambient,
    };
    let mut out = release(&scene, source.growing, free, fire, &around);
    out.lower_share = share;
    let (flaming, glowing) = (out.rates[0], out.rates[1]);
    burn_at_item(
        &scene,
        changes,
        &mut out,
        item,
        (flaming, glowing),
        rise,
        source.room,
    );

    let model = &building.model;
    let rates = fire_rates(model, fire, &around, source.growing);
    let progress = if source.growing {
        clock_rate(model, fire, &around, scene.fuel.doubling_flux)
    } else {
        1.0
    };
    out.rates = [
        progress,
        -out.given_off / scene.reaction.heat,
        rates.flamed,
        rates.embers,
        (zone_oxygen - oxygen) / plan.choices.breathing_lag,
    ];
    out.pilot = pilot(item, &out, fire.flamed, interface);
    out
}

fn pilot(item: &Item, out: &ItemRates, flamed: f64, interface: f64) -> f64 {
    let reach = item.surface_height + out.flame_height - interface;
    smoothstep(reach / PILOT_BAND + 0.5) * flamed.max(0.0) / (flamed.max(0.0) + NEIGHBOUR_FLAME)
}

/// Free release at the item's progress with its burn-out, W.
fn free(item: &Item, plan: &Plan, building: &Building, index: usize, time: f64, y: &[f64]) -> f64 {
    let source = &building.items[index];
    match &item.burning {
        Burning::Growing(curve) => {
            let clock = y[building.layout.item(index, ItemPlace::Progress)];
            let mass = y[building.layout.item(index, ItemPlace::Mass)].max(0.0);
            // Over its value at the full load, so that the curve given comes
            // back while there is plenty of fuel.
            let share = plan.choices.burnout_share;
            let left =
                burn_out(mass, source.mass, share) / burn_out(source.mass, source.mass, share);
            free_release(curve, clock) * left
        }
        Burning::AsGiven(curve) => {
            // It cannot give off more than there is.
            let mass = y[building.layout.item(index, ItemPlace::Mass)];
            free_release(curve, time - item.ignition) * smoothstep(mass / (LAST * source.mass))
        }
        Burning::Burner { rate, ramp, .. } => {
            rate * ((time - item.ignition) / ramp.max(1e-3)).clamp(0.0, 1.0)
        }
    }
}

/// What is given off; the flaming and glowing parts (W) are left in the first
/// two places of `rates` for the caller.
fn release(
    scene: &Scene<'_>,
    growing: bool,
    free: f64,
    fire: Fire,
    around: &Surroundings,
) -> ItemRates {
    let flamed = fire.flamed.clamp(0.0, 1.0);
    let (flaming, glowing, given_off) = if growing {
        let f = release_factors(
            &scene.building.model,
            fire,
            around,
            scene.fuel.doubling_flux,
            scene.fuel.critical_flux,
        );
        let beside = flamed / (flamed + NEIGHBOUR_FLAME);
        (
            free * (f.flaming + f.gasified * beside),
            // A curve measured in the open has its embers in it: they add only
            // where there is no flame.
            free * (1.0 - flamed) * f.glowing,
            free * (f.flaming + f.gasified + (1.0 - flamed) * f.glowing),
        )
    } else {
        (free * flamed, 0.0, free)
    };
    ItemRates {
        free,
        given_off,

        flame_height: flame_height(flaming, scene.diameter(flaming)).max(0.0),
        rates: [flaming, glowing, 0.0, 0.0, 0.0],
        ..ItemRates::default()
    }
}

/// Books release, plume and burning of an item in its room's layers.
fn burn_at_item(
    scene: &Scene<'_>,
    changes: &mut Changes,
    out: &mut ItemRates,
    item: &Item,
    (flaming, glowing): (f64, f64),
    rise: f64,
    room: usize,
) {
    let (lower, upper) = (2 * room + LOWER, 2 * room + UPPER);
    let (low, up) = (&scene.layers.layers[lower], &scene.layers.layers[upper]);
    let height = scene.building.rooms[room].height;
    let heat_per_oxygen = scene.reaction.heat_per_oxygen;
    let free_plume = scene.plume(flaming, rise);
    let plume = free_plume * low.available;
    let whole = scene.plume(flaming, height - item.surface_height);
    // What the column draws from the upper layer on its way to the ceiling.
    let within = (whole - free_plume).max(0.0) + (free_plume - plume);
    let share = out.lower_share;
    let oxygen_low = scene.layers.fractions(lower)[O2].max(0.0);
    let oxygen_up = scene.layers.fractions(upper)[O2].max(0.0);
    let below = min8(
        flaming + share * glowing,
        plume * oxygen_low * heat_per_oxygen,
    );
    let factor = scene.flame_factor(up.oxygen, up.temperature);
    let rest = (flaming + share * glowing - below).max(0.0);
    let above = min8(rest * factor, within * oxygen_up * heat_per_oxygen);
    let embers_above = (1.0 - share) * glowing * oxygen_up / (oxygen_up + 0.02);
    out.plume = plume;
    out.burned = below + above + embers_above;
    out.radiated = scene.fuel.radiative_fraction * out.burned;

    changes.transfer(scene.layers, lower, upper, plume);
    let vapour = scene.building.items[scene.item].fuel;
    changes.species_mut(upper)[FIRST_FUEL + vapour] += out.given_off / scene.reaction.heat;
    burn(changes, upper, scene.reaction, vapour, out.burned);
    changes.heat(upper, -out.radiated);
}

/// Burns unburned fuel inside a layer with the layer's own oxygen; gives the
/// heat released, W. `ignition` 0..1 combines hot gas and flames that touch it.
pub fn in_layer(
    building: &Building,
    plan: &Plan,
    layers: &Layers,
    changes: &mut Changes,
    layer: usize,
    ignition: f64,
) -> f64 {
    if ignition <= 0.0 {
        return 0.0;
    }
    let gas = &layers.layers[layer];
    let fractions = layers.fractions(layer);
    let demand: f64 = building
        .reactions
        .iter()
        .enumerate()
        .map(|(f, r)| fractions[FIRST_FUEL + f].max(0.0) * r.oxygen)
        .sum();
    let oxygen = fractions[O2].max(0.0);
    if demand <= 0.0 || oxygen <= 0.0 {
        return 0.0;
    }
    // Oxygen use rate, kg/s; harmonic in fuel demand and oxygen at hand.
    let use_rate =
        ignition * gas.mass * demand * oxygen / (demand + oxygen) / plan.choices.layer_mixing_time;
    let mut heat = 0.0;
    for (f, reaction) in building.reactions.iter().enumerate() {
        let power = use_rate * fractions[FIRST_FUEL + f].max(0.0) / demand * reaction.heat;
        burn(changes, layer, reaction, f, power);
        heat += power;
    }
    heat
}

/// Ignition of a layer by its own heat, 0..1.
pub fn own_ignition(choices: &Choices, temperature: f64) -> f64 {
    window(
        temperature,
        choices.autoignition_start,
        choices.autoignition_full,
    )
}
