//! Pressure and flow through small openings at a uniform pressure difference,
//! with constant heat capacity: hand-check forms for a heated leaky room.

/// Ratio of the gas constant to the heat capacity of air at constant pressure,
/// `R/cp = 287/1005`.
const GAS_CONSTANT_OVER_HEAT_CAPACITY: f64 = 287.0 / 1005.0;

/// Volume by which gas expands per second under a net heating, m3/s:
/// `dV/dt = Q R/(cp P)`.
///
/// `net_heating` Q in W (heat released less heat lost), `pressure` P the
/// absolute pressure in Pa. About 0.28 m3/s per 100 kW at one atmosphere.
/// Negative for net cooling. Exact for an ideal gas with constant `cp`.
#[must_use]
pub fn expansion(net_heating: f64, pressure: f64) -> f64 {
    net_heating * GAS_CONSTANT_OVER_HEAT_CAPACITY / pressure
}

/// Gauge pressure of a heated room that leaks through `area`, Pa:
/// `dp = rho/2 (dV/dt / (Cd A))^2` with the expansion of [`expansion`], in the
/// sign of the heating.
///
/// `area` in m2, `coefficient` Cd, `density` of the gas that leaves, kg/m3.
/// Quasi-steady; valid while `dp` is small against `pressure` (below some
/// kPa). Infinite (or zero without heating) for a room without leaks.
#[must_use]
pub fn pressure_from_heating(
    net_heating: f64,
    area: f64,
    coefficient: f64,
    density: f64,
    pressure: f64,
) -> f64 {
    let volume = expansion(net_heating, pressure);
    if volume == 0.0 {
        return 0.0;
    }
    orifice_difference(volume, area, coefficient, density)
}

/// Volume flow through an orifice, m3/s, in the sign of the difference:
/// `V = Cd A sqrt(2 |dp|/rho)`. `difference` in Pa, `area` in m2, `density` of
/// the gas that flows in kg/m3. Incompressible: below about 5 kPa.
#[must_use]
pub fn orifice(difference: f64, area: f64, coefficient: f64, density: f64) -> f64 {
    (coefficient * area * (2.0 * difference.abs() / density).sqrt()).copysign(difference)
}

/// Pressure difference that drives a volume flow through an orifice, Pa: the
/// inverse of [`orifice`].
#[must_use]
pub fn orifice_difference(volume_flow: f64, area: f64, coefficient: f64, density: f64) -> f64 {
    let speed = volume_flow / (coefficient * area);
    (0.5 * density * speed * speed).copysign(volume_flow)
}

/// Rate of pressure rise in a sealed room, Pa/s: `(gamma - 1) Q/V`,
/// `gamma = cp/(cp - R)`; `net_heating` Q in W, `volume` V in m3.
#[must_use]
pub fn sealed_pressure_rate(net_heating: f64, volume: f64) -> f64 {
    let gas = GAS_CONSTANT_OVER_HEAT_CAPACITY;
    gas / (1.0 - gas) * net_heating / volume
}
