//! Flow through a horizontal opening (hatch, stair, roof opening): what the
//! pressure drives one way, and the buoyant exchange of equal volumes both ways
//! while the dense gas lies on top.
//!
//! Exchange through one opening without net flow: Epstein 1988, Journal of Heat
//! Transfer 110:885 (brine over water, L/D 0.01 to 10; formula from memory).
//! Change-over to one-way flow beyond the flooding flow: Epstein and Kenton
//! 1989, Journal of Heat Transfer 111:980, and Cooper 1989, NISTIR 89-4052
//! (both from memory).
//!
//! The pressure-driven part keeps its ordinary orifice coefficient down to no
//! difference at all. Cooper's later reading of the tests lets the coefficient
//! fall towards 0.18 at flooding (from memory); here the flow is the measure of
//! flooding, not the pressure, so what a closed network pushes through is right
//! and the pressure below it is somewhat low.

use super::opening_flow::{GRAVITY, REGULARISATION};

/// Exchange number of a thin opening of any shape: volume flow each way over
/// `A sqrt(g sqrt(A) drho/rho)`. Epstein 1988 (0.055 on `D^(5/2)`, a circle:
/// 0.074); 0.07 from memory, 0.055 to 0.1 in the literature.
pub const THIN_EXCHANGE: f64 = 0.07;

/// Flooding flow over `A sqrt(2 g D drho/rho)` for `drho/rho` towards zero:
/// Cooper's fit to tests with salt water and hot gas, from memory.
const FLOODING_NUMBER: f64 = 0.1754;

/// Growth of the flooding flow with the density ratio, `exp(0.5536 drho/rho)`;
/// same source.
const FLOODING_GROWTH: f64 = 0.5536;

/// Density difference over the mean below which the exchange fades faster than
/// its square root, so that its slope stays finite; 0.005 is 1.5 K (choice).
const RATIO_STEP: f64 = 0.005;

/// Net flow over the flooding flow within which the fall of the exchange is
/// rounded (choice).
const TURN_STEP: f64 = 0.05;

/// Flow through a horizontal opening.
///
/// Upwards pass `max(driven, 0) + exchange`, downwards
/// `max(-driven, 0) + exchange`, m3/s at the source's density.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Horizontal {
    /// Net volume flow driven by the pressure difference, m3/s, positive
    /// upwards.
    pub driven: f64,
    /// Change of `driven` with the pressure difference, m3/s/Pa, never
    /// negative.
    pub slope: f64,
    /// Buoyant exchange, m3/s each way, never negative.
    pub exchange: f64,
}

/// Froude number `Q/sqrt(D^5 g drho/rho)` of the exchange each way through a
/// round opening or short shaft of length over diameter `length_ratio`.
///
/// Epstein 1988 (from memory):
///
/// ```text
/// 0.055 [1 + 400 x^3]^(1/6)
///   / [1 + 0.00527 (1 + 400 x^3)^(1/2) (x^6 + 117 x^2)^(3/4)]^(1/3)
/// ```
///
/// 0.055 for a thin opening, a peak near 0.1 at 0.6 and a fall beyond. Range
/// 0 to 10; below zero it is the thin opening.
#[must_use]
pub fn epstein_froude(length_ratio: f64) -> f64 {
    let x = length_ratio.max(0.0);
    let grown = 1.0 + 400.0 * x * x * x;
    let slowed = (x.powi(6) + 117.0 * x * x).powf(0.75);
    0.055 * grown.powf(1.0 / 6.0) / (1.0 + 0.00527 * grown.sqrt() * slowed).cbrt()
}

/// Factor of an opening of some depth over a thin one: for the
/// `exchange_factor` of [`horizontal`]. `depth` and `area` in m and m2; the
/// diameter is that of the circle of equal area. Between about 0.5 and 1.75 for
/// ratios to 10; one for a thin opening or none.
#[must_use]
pub fn depth_factor(depth: f64, area: f64) -> f64 {
    if area <= 0.0 {
        return 1.0;
    }
    epstein_froude(depth / equal_diameter(area)) / epstein_froude(0.0)
}

/// Diameter of the circle of equal area, m.
fn equal_diameter(area: f64) -> f64 {
    2.0 * (area / std::f64::consts::PI).sqrt()
}

/// How much denser the upper gas is, over the mean density; never negative.
fn unstable_ratio(density_below: f64, density_above: f64) -> f64 {
    let mean = 0.5 * (density_below + density_above);
    if mean > 0.0 {
        ((density_above - density_below) / mean).max(0.0)
    } else {
        0.0
    }
}

/// Square root of the density ratio, faded to zero with zero slope:
/// `x^2/(x^2 + e^2)^(3/4)`; 0.75 (e/x)^2 low.
fn faded_root(ratio: f64) -> f64 {
    let s = ratio * ratio + RATIO_STEP * RATIO_STEP;
    ratio * ratio / (s * s * s).sqrt().sqrt()
}

/// Exchange through a thin opening of any shape without net flow, m3/s each
/// way: `0.07 A sqrt(g sqrt(A) drho/rho)` with the mean density.
///
/// Zero when the light gas is on top. `area` in m2, densities in kg/m3. Range:
/// openings of a few m2, density ratios to about 3 (an extrapolation from salt
/// water).
#[must_use]
pub fn thin_exchange(area: f64, density_below: f64, density_above: f64) -> f64 {
    let area = area.max(0.0);
    let ratio = unstable_ratio(density_below, density_above);
    THIN_EXCHANGE * area * (GRAVITY * area.sqrt()).sqrt() * faded_root(ratio)
}

/// Net volume flow beyond which a thin opening passes gas one way only, m3/s:
/// `0.1754 A sqrt(2 g D x) exp(0.5536 x)`, `x = drho/rho`, `D` the diameter of
/// the circle of equal area. Zero when the light gas is on top.
///
/// 3.8 to 6 times the exchange without net flow; four times is what a constant
/// sum of the square roots of both flows asks for.
#[must_use]
pub fn flooding_flow(area: f64, density_below: f64, density_above: f64) -> f64 {
    let area = area.max(0.0);
    let ratio = unstable_ratio(density_below, density_above);
    let speed = (2.0 * GRAVITY * equal_diameter(area)).sqrt() * faded_root(ratio);
    FLOODING_NUMBER * area * speed * (FLOODING_GROWTH * ratio).exp()
}

/// Share of the exchange left under a net flow `driven` (m3/s, either way), one
/// without and zero from the `flooding` flow on.
///
/// `(1 - q/q_f)^2`: it follows from the flooding relation of opposed streams,
/// `sqrt(up) + sqrt(down)` constant (Wallis 1969, from memory), with `up` less
/// `down` the net flow, and ends with zero slope. Rounded within a twentieth of
/// the flooding flow about zero.
#[must_use]
pub fn exchange_left(driven: f64, flooding: f64) -> f64 {
    if flooding <= 0.0 {
        return 0.0;
    }
    let rounded = |x: f64| x.hypot(TURN_STEP) - TURN_STEP;
    let reached = rounded(driven / flooding) / rounded(1.0);
    let left = (1.0 - reached).max(0.0);
    left * left
}

/// Volume flow through an orifice and its slope with the pressure difference,
/// m3/s and m3/s/Pa: `C A sqrt(2/rho) f(d)`, `f(d) = d/(d^2 + e^2)^(1/4)`, with
/// the density of the side that gives, blended within the regularisation.
fn orifice(scale: f64, dp: f64, e: f64, density_below: f64, density_above: f64) -> (f64, f64) {
    let s2 = dp * dp + e * e;
    let s = s2.sqrt();
    let root = dp / s.sqrt();
    let root_slope = (1.0 - 0.5 * dp * dp / s2) / s.sqrt();
    let [below, above] = [density_below, density_above].map(|rho| (2.0 / rho).sqrt());
    let from_below = 0.5 * (1.0 + dp / s);
    let turn = 0.5 * e * e / (s2 * s);
    let speed = below * from_below + above * (1.0 - from_below);
    let slope = root_slope * speed + root * turn * (below - above);
    (scale * root * speed, scale * slope.max(0.0))
}

/// Flow through a horizontal opening: driven part, its slope, and exchange.
///
/// `area` the clear area in m2, `coefficient` of the driven part (0.6 to 0.7),
/// `exchange_factor` on exchange and flooding flow over those of a thin hole
/// (one; a stair 2 to 5, from memory; [`depth_factor`] for a deep one), `dp`
/// the pressure just below less that just above in Pa, densities of the gas
/// next below and above in kg/m3.
///
/// Smooth in all arguments; all zero for an opening without area or a density
/// that is not positive. Regularised orifice as in
/// [`super::opening_flow`].
#[must_use]
pub fn horizontal(
    area: f64,
    coefficient: f64,
    exchange_factor: f64,
    dp: f64,
    density_below: f64,
    density_above: f64,
) -> Horizontal {
    horizontal_regularised(
        area,
        coefficient,
        exchange_factor,
        dp,
        [density_below, density_above],
        REGULARISATION,
    )
}

/// [`horizontal`] with a difference `regularisation` (Pa, above zero) of its
/// own, below which the driven flow is linear; `density` below and above.
#[must_use]
pub fn horizontal_regularised(
    area: f64,
    coefficient: f64,
    exchange_factor: f64,
    dp: f64,
    density: [f64; 2],
    regularisation: f64,
) -> Horizontal {
    let [density_below, density_above] = density;
    if !(area > 0.0 && density_below > 0.0 && density_above > 0.0) {
        return Horizontal::default();
    }
    let scale = coefficient * area;
    let (driven, slope) = orifice(scale, dp, regularisation, density_below, density_above);
    let factor = exchange_factor.max(0.0);
    let flooding = factor * flooding_flow(area, density_below, density_above);
    let still = factor * thin_exchange(area, density_below, density_above);
    Horizontal {
        driven,
        slope,
        exchange: still * exchange_left(driven, flooding),
    }
}
