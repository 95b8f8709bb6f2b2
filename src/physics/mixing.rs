//! When the momentum of what goes through a room overturns its two layers.
//!
//! The measure is a bulk Richardson number `Ri = g (drho/rho) H/s^2` with the
//! room's height H and a stirring speed s. Where its bounds come from (all from
//! memory):
//!
//! - Newman 1984 (Combustion and Flame 57:33), ducts and corridors with
//!   through-flow: layers stand below a Froude number `1/sqrt(Ri)` of 0.9, blur
//!   above it and are gone at 10.
//! - Two layers in relative motion are stable to long waves while
//!   `s^2 < g' H`, Ri above 1; entrainment across a density step dies out at
//!   Ri 0.8 (Ellison and Turner 1959).
//! - To level two layers of depth a and b takes the work `g drho a b/2` per
//!   area. Their relative motion holds just that at `s^2 = g' H`, and a quarter
//!   of it at most goes into lifting (mixing efficiency 0.2 to 0.25): one
//!   flow-through levels the room at Ri = 0.25.
//!
//! So nothing is mixed above Ri 1.23 (Froude 0.9), all below 0.25 (Froude 2).
//!
//! A jet that enters spends its own kinetic energy in the room: its work per
//! volume, `u^2/2`, meets the need `g' H/8` (layers of half the height, per
//! volume that passes) at an efficiency of a quarter when `u^2 = g' H`: hence
//! twice the jet's speed counts in s.
//!
//! Range: rooms and corridors with a length up to about five times the height,
//! openings of 0.5 m2 and more. Only net flow is to be counted: the two streams
//! of a calm doorway leave and arrive at their own heights and keep the layers.

use super::opening_flow::GRAVITY;
use super::smooth::window;

/// Froude number `s/sqrt(g' H)` at which mixing begins (Newman 1984, from
/// memory).
pub const FIRST_FROUDE: f64 = 0.9;

/// Froude number at which one flow-through levels the room.
pub const FULL_FROUDE: f64 = 2.0;

/// Turnovers of the thinner layer in one flow-through time of a mixed room
/// (choice, range 4 to 12). Eight is an exchange of four times the through-flow
/// between layers of half the room: what a jet carries along after twelve of
/// its own widths, `0.32 x/d` (Ricou and Spalding 1961, from memory).
pub const TURNS: f64 = 8.0;

/// Density difference about which its size is rounded, and which counts in any
/// room, kg/m3 (choice; about 1 K).
pub const ALIKE: f64 = 0.004;

/// What enters a room through its openings, for the speed of its jets.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Entering {
    /// Net volume flow of the inflows, m3/s.
    flow: f64,
    /// Flow times speed squared, m5/s3.
    power: f64,
    /// Flow times the size of its density difference to the room, kg/s.
    weight: f64,
}

impl Entering {
    /// Adds the net flow into the room (m3/s, at its own density; outflow counts
    /// nothing) through an opening of a clear area (m2). For a fan give the
    /// area of its cone.
    pub fn add(&mut self, net_flow: f64, area: f64) {
        if net_flow > 0.0 && area > 0.0 {
            let speed = net_flow / area;
            self.flow += net_flow;
            self.power += net_flow * speed * speed;
        }
    }

    /// Notes how much a net flow (m3/s, as given to [`Entering::add`]) differs
    /// from the room in density (kg/m3, either sign): what is much lighter or
    /// heavier than the room makes layers of its own.
    pub fn differs(&mut self, net_flow: f64, difference: f64) {
        if net_flow > 0.0 {
            self.weight += net_flow * difference.hypot(ALIKE);
        }
    }

    /// Mean size of the density difference between what enters and the room,
    /// weighted by flow, kg/m3.
    #[must_use]
    pub fn contrast(&self) -> f64 {
        if self.flow > 0.0 {
            self.weight / self.flow
        } else {
            0.0
        }
    }

    /// Net volume flow that enters, m3/s: the room's through-flow.
    #[must_use]
    pub fn flow(&self) -> f64 {
        self.flow
    }

    /// Mean square speed of the jets weighted by flow, m2/s2.
    #[must_use]
    pub fn speed_squared(&self) -> f64 {
        if self.flow > 0.0 {
            self.power / self.flow
        } else {
            0.0
        }
    }
}

/// Stirring speed, m/s: `sqrt(u^2 + 4 (u_jet^2 - u^2))`, u the speed of the
/// through-flow over the room's cross-section.
///
/// `through_flow` in m3/s, `cross_section` (width times height) in m2,
/// `jet_speed_squared` of [`Entering`] in m2/s2. An opening as wide as the room
/// adds nothing to the through-flow's own speed.
#[must_use]
pub fn stirring_speed(through_flow: f64, cross_section: f64, jet_speed_squared: f64) -> f64 {
    let through = if cross_section > 0.0 {
        through_flow / cross_section
    } else {
        0.0
    };
    let own = through * through;
    (own + 4.0 * (jet_speed_squared - own).max(0.0)).sqrt()
}

/// Bulk Richardson number `g (drho/rho) h/s^2` of two layers, with the mean
/// density.
///
/// Densities in kg/m3, `height` of the room in m, `speed` in m/s (see
/// [`stirring_speed`]). Infinite without speed (nothing mixes), zero or below
/// where the upper layer is not the lighter one.
#[must_use]
pub fn richardson(density_lower: f64, density_upper: f64, height: f64, speed: f64) -> f64 {
    let mean = 0.5 * (density_lower + density_upper);
    if speed == 0.0 || mean <= 0.0 {
        return f64::INFINITY;
    }
    GRAVITY * (density_lower - density_upper) / mean * height / (speed * speed)
}

/// How far a room is mixed, 0 (two layers) to 1 (levelled within a
/// flow-through), by the Richardson number of [`richardson`].
///
/// Smooth step in the Froude number `1/sqrt(Ri)` from [`FIRST_FROUDE`] to
/// [`FULL_FROUDE`]: zero at and above Ri 1.23, a half at 0.48, one at and below
/// 0.25. Not a number counts as two layers.
#[must_use]
pub fn mixed_share(richardson: f64) -> f64 {
    if richardson.is_nan() {
        return 0.0;
    }
    if richardson <= 0.0 {
        return 1.0;
    }
    window(1.0 / richardson.sqrt(), FIRST_FROUDE, FULL_FROUDE)
}

/// Exchange between the layers of a mixing room, m3/s each way:
/// `8 share V/t`.
///
/// `thin_volume` V of the thinner layer in m3, `share` of [`mixed_share`],
/// `turnover` t the flow-through time in s (room volume over through-flow, or
/// length over through speed). With layers of half the room it is four times
/// the through-flow: their difference falls e-fold in a sixteenth of t, and a
/// cold stream that feeds one of them steadily leaves it at four fifths of the
/// other's rise. Fades with a vanishing layer. Zero without flow (`t` infinite).
#[must_use]
pub fn exchange_rate(thin_volume: f64, share: f64, turnover: f64) -> f64 {
    if turnover > 0.0 {
        TURNS * share.clamp(0.0, 1.0) * thin_volume.max(0.0) / turnover
    } else {
        0.0
    }
}
