//! The profile of finite thickness about the interface.
//!
//! A two-layer room has a step at the interface; a measured room has none. The
//! share of upper-layer gas at height `z` is
//! `s = 1/2 (1 + tanh(2 (z - z_i) / d))`, so that the steepest slope would
//! bridge the two layers over the thickness `d`. Temperature, species and soot
//! use the same share. The profile stays between the two layer values, and it
//! conserves nothing: it is a reconstruction.
//!
//! Form and thickness were fitted to the thermocouple arrays of sixteen
//! burner settings (DOI 10.5281/zenodo.5703474); see
//! `tests/evidence_profile.rs` and `docs/method.md`. A straight ramp, a
//! smoothstep, an error function and the hyperbolic tangent fit alike (within
//! 0.2 K of each other), so the simplest smooth one is used. The best
//! thickness is 0.30-0.51 m with the door open and 0.48-0.62 m with it shut;
//! the minimum is flat, and 0.5 m lies within 0.1 K of it over all settings.

/// Smallest thickness that is reckoned with, m; below it the profile is the
/// step of the two layers.
const SMALLEST_THICKNESS: f64 = 1e-6;

/// Share of upper-layer gas, 0..1, at `height` (m above the floor) for the
/// `interface` (m above the floor) and the `thickness` of the profile (m).
/// Not-a-number when height or interface is.
pub fn upper_share(height: f64, interface: f64, thickness: f64) -> f64 {
    let thickness = thickness.max(SMALLEST_THICKNESS);
    0.5 * (1.0 + (2.0 * (height - interface) / thickness).tanh())
}

/// Thickness that fits into the layers of a room, m: the stated one, but at
/// most twice the thinner layer. A layer that has all but gone would otherwise
/// still colour the gas at a head a quarter of a metre away from it.
pub fn fitting_thickness(stated: f64, interface: f64, room_height: f64) -> f64 {
    let thinner = interface.min(room_height - interface).max(0.0);
    stated.min(2.0 * thinner).max(SMALLEST_THICKNESS)
}

/// Value at a height between the `lower` and the `upper` layer's value for the
/// share of upper-layer gas, 0..1. Never outside the two values; not-a-number
/// when any of them is.
pub fn between(lower: f64, upper: f64, share: f64) -> f64 {
    let value = lower + (upper - lower) * share;
    if value.is_nan() {
        return f64::NAN;
    }
    value.max(lower.min(upper)).min(lower.max(upper))
}
