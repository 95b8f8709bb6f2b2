//! Wind on the outside of a building, and the pressure between columns of air
//! of different temperature.
//!
//! The pressure coefficients are the usual means for low buildings (about 0.7
//! to windward, -0.3 to -0.5 elsewhere; handbook tables after Liddament 1986,
//! from memory). They differ by half from one building to the next: give them
//! where they matter. Gusts are not modelled.

use super::opening_flow::GRAVITY;

/// Gas constant of dry air, J/kg/K.
const GAS_CONSTANT: f64 = 287.05;

/// Cosine of the angle within which the side turns into the windward front
/// (choice).
const TURN: f64 = 0.2;

/// Pressure coefficients of a building's outer faces.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PressureCoefficients {
    /// Facade that the wind blows straight on.
    pub windward: f64,
    /// Facade along the wind.
    pub side: f64,
    /// Facade turned away.
    pub lee: f64,
    /// Roof, flat or of low pitch.
    pub roof: f64,
}

impl Default for PressureCoefficients {
    /// 0.7, -0.5, -0.3 and -0.3, from memory; ranges 0.5 to 0.8, -0.3 to -0.8,
    /// -0.2 to -0.5 and -0.2 to -0.8.
    fn default() -> Self {
        Self {
            windward: 0.7,
            side: -0.5,
            lee: -0.3,
            roof: -0.3,
        }
    }
}

impl PressureCoefficients {
    /// Coefficient of a facade whose outward normal makes `angle` degrees with
    /// the direction the wind comes from (0 windward, 90 side, 180 lee; any
    /// turn and sign).
    ///
    /// In front it rises with the cosine, behind it comes back with its square;
    /// the slope has no jump. At 45 degrees 0.31 with the defaults (tables: about
    /// 0.35, from memory).
    #[must_use]
    pub fn facade(&self, angle: f64) -> f64 {
        let x = angle.to_radians().cos();
        if x > 0.0 {
            let ramp = if x < TURN {
                0.5 * x * x / TURN
            } else {
                x - 0.5 * TURN
            };
            self.side + (self.windward - self.side) * ramp / (1.0 - 0.5 * TURN)
        } else {
            self.side + (self.lee - self.side) * x * x
        }
    }
}

/// Dynamic pressure of the wind, Pa: `rho u^2/2`; `speed` in m/s at the height
/// of the opening, `density` of the open air in kg/m3.
#[must_use]
pub fn dynamic_pressure(speed: f64, density: f64) -> f64 {
    0.5 * density * speed * speed
}

/// Angle between the direction the wind comes from and the one a facade looks
/// to, both in degrees clockwise from north: 0 to 180.
#[must_use]
pub fn angle_between(wind_from: f64, facade_looks: f64) -> f64 {
    let turned = (wind_from - facade_looks).rem_euclid(360.0);
    turned.min(360.0 - turned)
}

/// Wind pressure on a facade with the default coefficients, Pa above the open
/// air at the same height. `speed` in m/s, `angle` in degrees between where the
/// wind comes from and the outward normal, `density` in kg/m3.
#[must_use]
pub fn facade_pressure(speed: f64, angle: f64, density: f64) -> f64 {
    PressureCoefficients::default().facade(angle) * dynamic_pressure(speed, density)
}

/// Wind pressure on a roof with the default coefficient, Pa.
#[must_use]
pub fn roof_pressure(speed: f64, density: f64) -> f64 {
    PressureCoefficients::default().roof * dynamic_pressure(speed, density)
}

/// Stack pressure over a height, Pa: `3460 (1/To - 1/Ti) h`, the rise of the
/// difference inside less outside between two levels `height` m apart.
///
/// Temperatures in K. The hand form of [`column_difference`] at one atmosphere
/// (`g P/R` = 3463 K Pa/m), within half a per cent up to some 100 m.
#[must_use]
pub fn stack_pressure(outside: f64, inside: f64, height: f64) -> f64 {
    3460.0 * (1.0 / outside - 1.0 / inside) * height
}

/// Exact form of [`stack_pressure`] for two columns of one temperature each,
/// Pa: `P [exp(-g h/(R Ti)) - exp(-g h/(R To))]`, both columns at `pressure` P
/// (Pa, absolute) at the lower level.
#[must_use]
pub fn column_difference(pressure: f64, outside: f64, inside: f64, height: f64) -> f64 {
    let [inside, outside] =
        [inside, outside].map(|t| (-GRAVITY * height / (GAS_CONSTANT * t)).exp_m1());
    pressure * (inside - outside)
}
