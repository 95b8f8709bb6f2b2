//! Glass heated by the room, when it cracks and when it falls out, and hollow
//! doors that burn through.
//!
//! Cracking is not yet an opening: panes stay in their frames after it. When
//! they fall is uncertain by nature; all levels here are defaults of inputs,
//! with the ranges stated.

use super::enclosure::black;

/// Convection from the room's gas to the glass, W/m2/K (5 to 25 in room fires;
/// handbook values, from memory).
pub const INSIDE_CONVECTION: f64 = 12.0;

/// Convection from the glass to the open air in light wind, W/m2/K (5 to 20,
/// from memory).
pub const OUTSIDE_CONVECTION: f64 = 10.0;

/// Emissivity of window glass in the infrared (0.84 to 0.92, from memory).
pub const EMISSIVITY: f64 = 0.84;

/// Density of window glass, kg/m3 (building guide).
pub const DENSITY: f64 = 2500.0;

/// Heat capacity of window glass, J/kg/K (building guide).
pub const HEAT_CAPACITY: f64 = 840.0;

/// A pane, lumped over its thickness.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Pane {
    /// Thickness, m (0.003 to 0.008).
    pub thickness: f64,
    /// Density, kg/m3.
    pub density: f64,
    /// Heat capacity, J/kg/K.
    pub heat_capacity: f64,
    /// Emissivity of both faces.
    pub emissivity: f64,
}

/// When glass of one kind cracks and falls out.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct FallOut {
    /// Rise of the pane over its shaded edge at which it cracks, K.
    pub crack_rise: f64,
    /// Temperature of the gas before it at which it falls out, K.
    pub gas_temperature: f64,
    /// Thickness of the inner pane, m.
    pub thickness: f64,
}

/// Rise at which a pane cracks, K. Range 60 to 80 K, after Keski-Rahkonen 1988
/// (from memory), see [`crack_rise`].
pub const CRACK_RISE: f64 = 70.0;

/// A thin single pane, 3 mm: falls out at 350 °C gas (mean 340 °C, spread 50 K,
/// from memory; at 450 °C one review puts the chance at a sixth, Babrauskas
/// 1998). Range 300 to 450 °C.
pub const SINGLE_THIN: FallOut = FallOut {
    crack_rise: CRACK_RISE,
    gas_temperature: 623.15,
    thickness: 0.003,
};

/// A thick single pane, 4 to 6 mm: 450 °C, from memory. Range 350 to 550 °C.
pub const SINGLE_THICK: FallOut = FallOut {
    crack_rise: CRACK_RISE,
    gas_temperature: 723.15,
    thickness: 0.006,
};

/// Double glazing, both panes: 600 °C, from memory. Range 450 to 750 °C.
pub const DOUBLE: FallOut = FallOut {
    crack_rise: CRACK_RISE,
    gas_temperature: 873.15,
    thickness: 0.004,
};

/// Rise of the heated pane over its shaded edge at which it cracks, K:
/// `strength/(modulus expansion)`.
///
/// `strength` at the edge and `modulus` of elasticity in Pa, `expansion` per
/// K. Keski-Rahkonen 1988, from memory: the edge is held by the cold frame and
/// carries the whole strain. 40 MPa, 70 GPa and 9e-6/K give 63 K.
#[must_use]
pub fn crack_rise(strength: f64, modulus: f64, expansion: f64) -> f64 {
    strength / (modulus * expansion)
}

/// Heating rate of a single pane towards the open air, K/s.
///
/// `temperature` of the pane, `gas` of the lower and upper layer and `outside`
/// in K; `share_above` is the share of its height in the upper layer (0 to 1);
/// `irradiation` all that falls on its inner face, W/m2 (in a room of one
/// temperature that of a black body).
///
/// ```text
/// rho c d dT/dt = h_i [s (T_u - T) + (1 - s) (T_l - T)] + e (G - sigma T^4)
///                 - h_o (T - T_o) - e sigma (T^4 - T_o^4)
/// ```
///
/// Lumped: the faces of a pane under 8 mm differ by less than a tenth of its
/// rise. No radiation through the glass (opaque beyond 3 micrometres; a flame
/// sends some of its own below that, so a pane close to flames is heated
/// somewhat slower than this). Of double glazing it is the inner pane, which
/// loses less than this outwards: the rate is low by up to a third once it is
/// hot. A pane without mass does not change.
#[must_use]
pub fn pane_rate(
    pane: &Pane,
    temperature: f64,
    gas: [f64; 2],
    share_above: f64,
    irradiation: f64,
    outside: f64,
) -> f64 {
    let capacity = pane.density * pane.heat_capacity * pane.thickness;
    if capacity <= 0.0 {
        return 0.0;
    }
    let before = gas[0] + share_above.clamp(0.0, 1.0) * (gas[1] - gas[0]);
    let own = black(temperature);
    let inside = INSIDE_CONVECTION * (before - temperature) + pane.emissivity * (irradiation - own);
    let lost =
        OUTSIDE_CONVECTION * (temperature - outside) + pane.emissivity * (own - black(outside));
    (inside - lost) / capacity
}

/// Gas temperature at which a hollow door is taken to fail after
/// [`HOLLOW_DOOR_DELAY`], K (450 °C; range 350 to 600 °C, choice by
/// [`hollow_door_rate`]).
pub const HOLLOW_DOOR_TEMPERATURE: f64 = 723.15;

/// Time that a hollow door stands at [`HOLLOW_DOOR_TEMPERATURE`], s (range 180
/// to 660 s: thin panels 5 min, faced ones 11 to 26 min in a furnace).
pub const HOLLOW_DOOR_DELAY: f64 = 300.0;

/// Temperature from which wood chars, K (300 °C, from memory).
const CHARRING: f64 = 573.15;

/// Area under the standard furnace curve above [`CHARRING`] in its first five
/// minutes, K s: `T = 20 + 345 log10(8 t + 1)` °C, t in min.
const FURNACE_AREA: f64 = 46_200.0;

/// Rate at which a hollow-core door is used up, 1/s; it fails when the integral
/// reaches one.
///
/// `gas` is the temperature before the door in K. Equal areas under the
/// temperature curve above 300 °C count as equal severity (Ingberg 1928, from
/// memory), tied to the five minutes that thin panel doors stand in a furnace
/// (code table for existing buildings). 308 s at 450 °C, 154 s at 600 °C, 66 s
/// at 1000 °C; zero below charring. Range 300 to 1000 °C.
#[must_use]
pub fn hollow_door_rate(gas: f64) -> f64 {
    (gas - CHARRING).max(0.0) / FURNACE_AREA
}
