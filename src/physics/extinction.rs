//! When a diffusion flame goes out for want of oxygen.

/// Critical flame temperature of a buoyant diffusion flame, K: about 1700 with
/// +-100 (Beyler's value for hydrocarbons, from memory).
pub const CRITICAL_FLAME_TEMPERATURE: f64 = 1700.0;

/// Oxygen volume fraction (wet) below which a flame goes out in gas at
/// `gas_k`.
///
/// `X_lim = X20 [1 + 8.5e-4 (Tc - 1700)] th [1 + 0.19 (1 - th)]`,
/// `th = (Tc - Tin)/(Tc - 293)`: the oxygen at which stoichiometric burning in
/// air thinned by its own products just reaches the critical flame temperature
/// `critical_k`; a fit to equilibrium flames (methane, propane, ethanol, wood,
/// polyurethane; largest error 0.0012 for gas of 20 to 800 °C and critical
/// temperatures of 1500 to 1800 K). `limit_at_20` is the fuel's limit at 20 °C
/// and 1700 K. Zero for gas at or above the critical temperature; no limit can
/// be drawn, and zero is given, where the critical temperature is at or below
/// 293 K.
#[must_use]
pub fn limiting_oxygen(limit_at_20: f64, critical_k: f64, gas_k: f64) -> f64 {
    if critical_k <= 293.0 || gas_k >= critical_k {
        return 0.0;
    }
    let th = (critical_k - gas_k) / (critical_k - 293.0);
    let at_20 = limit_at_20 * (1.0 + 8.5e-4 * (critical_k - CRITICAL_FLAME_TEMPERATURE));
    (at_20 * th * (1.0 + 0.19 * (1.0 - th))).max(0.0)
}

/// Share of a flame that burns, 0 to 1: `1/2 (1 + tanh((x - x_lim)/width))`.
///
/// `x` and `x_lim` are oxygen volume fractions, `width` the half-width of the
/// passage in the same measure (0.01 is usual; choice). A width of zero or
/// below gives the sharp step.
#[must_use]
pub fn burning_factor(x: f64, x_lim: f64, width: f64) -> f64 {
    if width <= 0.0 {
        return if x >= x_lim { 1.0 } else { 0.0 };
    }
    0.5 * (1.0 + ((x - x_lim) / width).tanh())
}
