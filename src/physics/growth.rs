//! How a fire grows in the open: t-squared growth, its cap and its burning
//! out.

use super::smooth::soft_cap;

/// Published growth coefficients, W/s2 (t-squared fires that reach 1055 kW in
/// 600, 300, 150 and 75 s).
pub const SLOW: f64 = 2.93;
/// Medium growth, W/s2.
pub const MEDIUM: f64 = 11.72;
/// Fast growth, W/s2.
pub const FAST: f64 = 46.9;
/// Ultra-fast growth, W/s2.
pub const ULTRA_FAST: f64 = 187.6;

/// Release of a t-squared fire, W: `alpha t^2` up to `peak`, then `peak`.
///
/// `alpha` in W/s2, `peak` in W, `time` since established burning in s. Zero
/// before zero. The corner lies at [`time_of_cap`].
#[must_use]
pub fn t_squared(alpha: f64, peak: f64, time: f64) -> f64 {
    let t = time.max(0.0);
    (alpha * t * t).min(peak)
}

/// Time at which a t-squared fire reaches its `peak`, s: `sqrt(peak/alpha)`.
/// Infinite for a fire that does not grow.
#[must_use]
pub fn time_of_cap(alpha: f64, peak: f64) -> f64 {
    if peak <= 0.0 {
        return 0.0;
    }
    if alpha <= 0.0 {
        return f64::INFINITY;
    }
    (peak / alpha).sqrt()
}

/// Heat released by a t-squared fire from its start to `time`, J:
/// `alpha t^3/3` before the cap, `peak` per second after it.
#[must_use]
pub fn t_squared_energy(alpha: f64, peak: f64, time: f64) -> f64 {
    let cap = time_of_cap(alpha, peak);
    let growing = time.max(0.0).min(cap);
    let steady = (time - cap).max(0.0);
    alpha * growing * growing * growing / 3.0 + peak * steady
}

/// Share of the free release that is left as the fuel runs out:
/// `B = r/(1 + r^4)^(1/4)`, `r = m/(f m0)`.
///
/// `fuel` m and `load` m0 in kg, `decay_share` f the share of the load at
/// which burning-out starts (0.3 is usual; choice). One with plenty of fuel,
/// 0.84 at `r = 1`, zero without fuel. Without a decay share or load it is 1
/// while there is fuel.
#[must_use]
pub fn burn_out(fuel: f64, load: f64, decay_share: f64) -> f64 {
    if fuel <= 0.0 {
        return 0.0;
    }
    let start = decay_share * load;
    if start <= 0.0 {
        return 1.0;
    }
    soft_cap(fuel / start, 1.0)
}
