//! Water vapour in moist air.

/// Critical temperature of water, K (IAPWS).
const CRITICAL_TEMPERATURE: f64 = 647.096;
/// Critical pressure of water, Pa (IAPWS).
const CRITICAL_PRESSURE: f64 = 22.064e6;

/// Saturation pressure over liquid water, Pa.
///
/// `ln(p/pc) = Tc/T (a1 t + a2 t^1.5 + a3 t^3 + a4 t^3.5 + a5 t^4 + a6 t^7.5)`,
/// `t = 1 - T/Tc` (Wagner and Pruss 1993/2002, the IAPWS auxiliary equation,
/// coefficients from memory). Range 273.16 to 647.096 K, within 0.02 %; runs on
/// smoothly over supercooled water to about 240 K, as weather services state
/// humidity. Held at the critical pressure above the critical temperature;
/// temperatures below 150 K count as 150 K.
#[must_use]
pub fn saturation_pressure(temperature: f64) -> f64 {
    let temperature = temperature.clamp(150.0, CRITICAL_TEMPERATURE);
    let t = 1.0 - temperature / CRITICAL_TEMPERATURE;
    let root = t.sqrt();
    let cube = t * t * t;
    let sum = -7.859_517_83 * t + 1.844_082_59 * t * root - 11.786_649_7 * cube
        + 22.680_741_1 * cube * root
        - 15.961_871_9 * cube * t
        + 1.801_225_02 * cube * cube * t * root;
    CRITICAL_PRESSURE * (CRITICAL_TEMPERATURE / temperature * sum).exp()
}

/// Mole fraction of water vapour in moist air, 0 to 1: `RH p_sat(T)/p`.
///
/// `temperature` in K, `relative_humidity` 0 to 1 (over liquid water),
/// `pressure` in Pa. Humidity is held within 0 to 1 and the result at 1.
#[must_use]
pub fn vapour_fraction(temperature: f64, relative_humidity: f64, pressure: f64) -> f64 {
    if pressure <= 0.0 {
        return 0.0;
    }
    (relative_humidity.clamp(0.0, 1.0) * saturation_pressure(temperature) / pressure).min(1.0)
}
