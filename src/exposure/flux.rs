//! Radiation of the smoke layer and the ceiling at a head.
//!
//! Layer and ceiling only: the flame itself, the walls and what the person
//! sends back are not in it. Near a flame the true flux is higher.

use std::f64::consts::PI;

/// Stefan-Boltzmann constant, W/m2/K4 (CODATA 2018).
const STEFAN_BOLTZMANN: f64 = 5.670_374_419e-8;

/// View factor, 0..1, from a small horizontal element facing up to a
/// rectangle `width` x `length` (m) whose centre is `drop` (m) above it:
/// four times the factor to a rectangle with a corner above the element,
/// `F = [X/sqrt(1+X2) atan(Y/sqrt(1+X2)) + Y/sqrt(1+Y2) atan(X/sqrt(1+Y2))]/(2 pi)`
/// with `X = width/2/drop`, `Y = length/2/drop` (Hamilton and Morgan 1952, NACA
/// TN 2836; Howell, catalogue of configuration factors; from memory).
///
/// It goes to 1 with no slope as the drop goes to nothing, and is 1 for an
/// element inside the layer (drop 0 or less). 0 for a rectangle without area.
pub fn view_factor_below(width: f64, length: f64, drop: f64) -> f64 {
    if drop.is_nan() || width.is_nan() || length.is_nan() {
        return f64::NAN;
    }
    if width <= 0.0 || length <= 0.0 {
        return 0.0;
    }
    if drop <= 0.0 {
        return 1.0;
    }
    let x = 0.5 * width / drop;
    let y = 0.5 * length / drop;
    let root_x = x.hypot(1.0);
    let root_y = y.hypot(1.0);
    2.0 / PI * (x / root_x * (y / root_x).atan() + y / root_y * (x / root_y).atan())
}

/// Radiation leaving the underside of the layer, W/m2: the layer's own at its
/// temperature (K) and emissivity (0..1), and the ceiling's (K) through it,
/// `eps sigma T_U^4 + (1 - eps) sigma T_c^4`. The ceiling counts as black.
pub fn from_layer(emissivity: f64, layer: f64, ceiling: f64) -> f64 {
    STEFAN_BOLTZMANN * (emissivity * layer.powi(4) + (1.0 - emissivity) * ceiling.powi(4))
}
