//! The front of cold air that runs in along the floor after an opening.

/// Acceleration of gravity, m/s2.
const GRAVITY: f64 = 9.81;

/// Froude number of the front behind a slot or window (Fleischmann 1994, from
/// memory).
pub const FROUDE_SLOT: f64 = 0.32;
/// Froude number behind a door (from memory).
pub const FROUDE_DOOR: f64 = 0.35;
/// Froude number behind a fully open end (from memory).
pub const FROUDE_FULL: f64 = 0.44;

/// Speed of the front, m/s: `v = Fr sqrt(beta g h)`,
/// `beta = (rho_air - rho_gas)/rho_gas`.
///
/// `air_density` and `gas_density` in kg/m3, `height` h of the space in m.
/// Range: hot gas fills the height, rooms of some metres (Fleischmann 1994,
/// NIST-GCR-94-646, from memory). Zero where the air outside is not denser.
#[must_use]
pub fn speed(froude: f64, air_density: f64, gas_density: f64, height: f64) -> f64 {
    if gas_density <= 0.0 || height <= 0.0 {
        return 0.0;
    }
    let beta = ((air_density - gas_density) / gas_density).max(0.0);
    froude * (beta * GRAVITY * height).sqrt()
}

/// Time the front takes over a `path` in m, s; infinite for a front that does
/// not move, zero for no path.
#[must_use]
pub fn travel_time(path: f64, speed: f64) -> f64 {
    if path <= 0.0 {
        0.0
    } else if speed <= 0.0 {
        f64::INFINITY
    } else {
        path / speed
    }
}
