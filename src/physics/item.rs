//! How a burning item starves and comes back: progress clock, flamed share and
//! ember bed. Rates of change as pure functions of the item's state and what
//! reaches it; no switches, so extinction and relighting have memory.
//!
//! Mass flux falling with oxygen and rising with radiation follows Utiskul and
//! Quintiere 2005 in spirit (from memory); flamed share, embers and the share
//! rule are this project's own, derived and tried in its design studies; the
//! numbers that were chosen or fitted there are marked in `docs/method.md`.

use super::smooth::{min8, softplus};

/// Coefficients of the item model, see [`crate::plan::Choices`] for meanings
/// and ranges. SI.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ItemModel {
    /// Exponent of the oxygen ratio in the mass flux.
    pub flux_exponent: f64,
    /// Exponent of the oxygen ratio in the clock.
    pub clock_exponent: f64,
    /// Cap of the radiation term plus one.
    pub feedback_cap: f64,
    /// Time of re-spread, s.
    pub respread_time: f64,
    /// Time of flame-out, s.
    pub flame_out_time: f64,
    /// Relighting strength of embers.
    pub ember_strength: f64,
    /// Smallest flamed share that can spread.
    pub smallest_flame: f64,
    /// Glowing release as a share of the free rate.
    pub ember_release: f64,
    /// Charring time, s.
    pub charring_time: f64,
    /// Ember life, s.
    pub ember_life: f64,
}

/// What reaches the item.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Surroundings {
    /// Oxygen that the base breathes over that of the outside air.
    pub oxygen_ratio: f64,
    /// The same as a volume fraction.
    pub oxygen: f64,
    /// Flame factor at the base, 0..1 ([`super::extinction::burning_factor`]).
    pub flame_factor: f64,
    /// Share of the hot-ignition window at the base, 0..1.
    pub hot_ignition: f64,
    /// Radiant flux on the item less what a surface at the outside temperature
    /// sends back, W/m2.
    pub flux: f64,
}

/// Flamed share and ember activity of an item.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Fire {
    /// Share of the burning area that carries flame, 0..1.
    pub flamed: f64,
    /// Ember activity, 0..1.
    pub embers: f64,
}

/// Radiation term `e`: flux over the flux that doubles the free rate, softly
/// capped at `cap - 1`.
pub fn radiation_term(flux: f64, doubling_flux: f64, cap: f64) -> f64 {
    let x = flux.max(0.0) / doubling_flux;
    let r = x / (cap - 1.0);
    let r2 = r * r;
    x / (1.0 + r2 * r2).sqrt().sqrt()
}

/// Release of volatiles over the free release: part in flame, part gasified
/// without flame, glowing part.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ReleaseFactors {
    /// In flame.
    pub flaming: f64,
    /// Gasified by radiation where there is no flame.
    pub gasified: f64,
    /// Burned by the ember bed.
    pub glowing: f64,
}

/// Release of volatiles by an item with free-burning curve, over the free
/// release at its progress.
pub fn release_factors(
    model: &ItemModel,
    fire: Fire,
    around: &Surroundings,
    doubling_flux: f64,
    critical_flux: f64,
) -> ReleaseFactors {
    let e = radiation_term(around.flux, doubling_flux, model.feedback_cap);
    let flamed = fire.flamed.clamp(0.0, 1.0);
    let excess = softplus(around.flux - critical_flux, 1e3) / doubling_flux;
    ReleaseFactors {
        flaming: flamed * (around.oxygen_ratio.max(0.0).powf(model.flux_exponent) + e),
        gasified: (1.0 - flamed) * excess,
        glowing: model.ember_release * fire.embers.max(0.0) * around.oxygen
            / (around.oxygen + 0.03),
    }
}

/// Rate of the item's clock, s/s.
pub fn clock_rate(model: &ItemModel, fire: Fire, around: &Surroundings, doubling_flux: f64) -> f64 {
    let e = radiation_term(around.flux, doubling_flux, model.feedback_cap);
    fire.flamed.clamp(0.0, 1.0) * (around.oxygen_ratio.max(0.0).powf(model.clock_exponent) + e)
}

/// Rates of change of flamed share and embers, 1/s. `with_embers` is false for
/// a gas burner and for a rate as given.
pub fn fire_rates(model: &ItemModel, fire: Fire, around: &Surroundings, with_embers: bool) -> Fire {
    let f = fire.flamed;
    let f0 = model.smallest_flame;
    let e = if with_embers { fire.embers } else { 0.0 };
    let s = around.flame_factor;
    let spread = f * f / (f.max(0.0) + f0) + model.ember_strength * e + around.hot_ignition;
    let loss = f0 * f / (f.max(0.0) + f0);
    let flamed = s * (1.0 - f) * (spread - loss) / model.respread_time
        - (1.0 - s) * f / model.flame_out_time;
    let embers = if with_embers {
        f * (1.0 - e) / model.charring_time - (1.0 - f) * e / model.ember_life
    } else {
        0.0
    };
    Fire { flamed, embers }
}

/// Share of the base's air that comes from the lower layer: what the plume can
/// draw from it (kg/s) over what the flame needs (kg/s), at most one.
pub fn lower_share(plume_flow: f64, air_needed: f64) -> f64 {
    if air_needed <= 0.0 {
        return 1.0;
    }
    min8(plume_flow, air_needed) / air_needed
}
