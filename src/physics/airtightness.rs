//! Leakage from an air-tightness test: air changes per hour at 50 Pa, turned
//! into flows and areas.

/// Pressure difference of the test, Pa.
pub const TEST_PRESSURE: f64 = 50.0;

/// Exponent of the leakage flow with pressure (0.6 to 0.7 for dwellings, from
/// memory).
pub const FLOW_EXPONENT: f64 = 0.65;

/// Orifice coefficient that goes with the areas of [`orifice_area`].
pub const COEFFICIENT: f64 = 0.6;

/// Volume flow in the test, m3/s: `n V/3600`; `air_changes` n per hour at 50
/// Pa, `volume` V of the rooms named in m3.
#[must_use]
pub fn test_flow(air_changes: f64, volume: f64) -> f64 {
    air_changes * volume / 3600.0
}

/// Volume flow at another pressure difference, m3/s, in its sign:
/// `Q50 (dp/50)^0.65`. `difference` in Pa; tests cover 10 to 70 Pa, 4 Pa is the
/// usual lower end.
#[must_use]
pub fn leakage_flow(air_changes: f64, volume: f64, difference: f64) -> f64 {
    let share = (difference.abs() / TEST_PRESSURE).powf(FLOW_EXPONENT);
    (test_flow(air_changes, volume) * share).copysign(difference)
}

/// Orifice area (coefficient 0.6) that passes the test flow at 50 Pa, m2.
/// `density` of the air in kg/m3 (1.2). Below 50 Pa the power law passes less
/// than this orifice: 0.79 of it at 10 Pa, 0.71 at 5 Pa.
#[must_use]
pub fn orifice_area(air_changes: f64, volume: f64, density: f64) -> f64 {
    test_flow(air_changes, volume) / (COEFFICIENT * (2.0 * TEST_PRESSURE / density).sqrt())
}

/// Effective leakage area as the trade states it, m2: the flow at 4 Pa through
/// an orifice of coefficient one.
#[must_use]
pub fn effective_area(air_changes: f64, volume: f64, density: f64) -> f64 {
    let pressure: f64 = 4.0;
    leakage_flow(air_changes, volume, pressure) / (2.0 * pressure / density).sqrt()
}
