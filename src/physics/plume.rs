//! Air drawn in by fire plumes, by jets of hot gas from openings and by cold
//! gas that falls through hot gas.
//!
//! The published forms take the release in kW; the functions take W and
//! convert inside. All hold for surroundings near 20 °C.

/// Release below which every plume fades to nothing, W. The published powers
/// of the release have an infinite slope at zero; the factor `q/(q + 200 W)`
/// gives a finite one and costs 2 % at 10 kW (choice).
const FADE_RELEASE: f64 = 200.0;

/// Jet flow below which a jet fades to nothing, kg/s (choice; 1 % at 10 g/s).
const FADE_FLOW: f64 = 1e-4;

/// Coefficient of the far-field plume, kg/s / (kW^(1/3) m^(5/3)); Zukoski,
/// Kubota, Cetegen 1980/81, from memory.
const FAR_FIELD: f64 = 0.071;

/// Temperature of the surroundings in which `FAR_FIELD` was measured, K.
const FAR_FIELD_SURROUNDINGS: f64 = 293.15;

/// Natural logarithms of McCaffrey's branch limits 0.08 and 0.20 m/kW^(2/5).
const LN_X_FLAME: f64 = -2.525_728_644_308_255;
const LN_X_PLUME: f64 = -1.609_437_912_434_100_3;

/// Coefficients of the outer branches that meet the published middle one:
/// `0.026 * 0.08^(0.909 - 0.566)` and `0.026 * 0.20^(0.909 - 1.895)`.
const FLAME_COEFFICIENT: f64 = 0.010_932_845_567_779_856;
const PLUME_COEFFICIENT: f64 = 0.127_103_576_833_211_27;

/// Which published plume law is used.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Law {
    /// McCaffrey 1979 (NBSIR 79-1910): flame, intermittent and far field.
    #[default]
    McCaffrey,
    /// Heskestad 1984: virtual origin and flame height of a fire of diameter D.
    Heskestad,
    /// Zukoski 1981: far-field plume from a point at the fire's surface.
    Zukoski,
}

/// Mass flow in a plume at the height `z_m` above the fire, kg/s, after
/// McCaffrey 1979 (NBSIR 79-1910), coefficients from memory.
///
/// With `x = z / Q^(2/5)`, Q the total release in kW:
/// `m = 0.011 Q x^0.566` for `x < 0.08`, `0.026 Q x^0.909` to 0.20,
/// `0.124 Q x^1.895` above. The first and last are rescaled (by -0.6 % and
/// +2.5 %) to meet the middle one. Range: fires of roughly 10 kW to some MW in
/// open room air. `z_m <= 0` or `q_w <= 0` gives zero; below some kW the flow
/// carries the factor `q/(q + 200 W)`.
#[must_use]
pub fn mccaffrey(q_w: f64, z_m: f64) -> f64 {
    if q_w <= 0.0 || z_m <= 0.0 {
        return 0.0;
    }
    let ln_q = (q_w * 1e-3).ln();
    let ln_x = z_m.ln() - 0.4 * ln_q;
    let (coefficient, power) = if ln_x < LN_X_FLAME {
        (FLAME_COEFFICIENT, 0.566)
    } else if ln_x < LN_X_PLUME {
        (0.026, 0.909)
    } else {
        (PLUME_COEFFICIENT, 1.895)
    };
    coefficient * (ln_q + power * ln_x).exp() * fade(q_w)
}

/// Mean flame height above the fire's surface, m, after Heskestad 1983.
///
/// `L = 0.235 Q^(2/5) - 1.02 D`, Q in kW, D the diameter in m. Range about
/// 7 < Q^(2/5)/D < 700 kW^(2/5)/m. Zero where the formula is negative (a
/// low, broken flame) or without release.
#[must_use]
pub fn flame_height(q_w: f64, diameter_m: f64) -> f64 {
    if q_w <= 0.0 {
        return 0.0;
    }
    (0.235 * (q_w * 1e-3).powf(0.4) - 1.02 * diameter_m).max(0.0)
}

/// Height of the virtual origin above the fire's surface, m, after Heskestad
/// 1983: `z0 = 0.083 Q^(2/5) - 1.02 D`, Q in kW, D in m. Usually negative for
/// wide, weak fires; without release it is `-1.02 D`.
#[must_use]
pub fn virtual_origin(q_w: f64, diameter_m: f64) -> f64 {
    0.083 * (q_w.max(0.0) * 1e-3).powf(0.4) - 1.02 * diameter_m
}

/// Mass flow in a plume at the height `z_m` above the fire, kg/s, after
/// Heskestad 1984, coefficients from memory.
///
/// Above the flame height L: `m = 0.071 Qc^(1/3) (z - z0)^(5/3) + 0.0018 Qc`
/// with the convective release `Qc = (1 - radiative_fraction) Q` in kW and the
/// virtual origin z0. Below L the flow grows in proportion to height, from
/// zero to the value at L (published: `0.0056 Qc z/L`, equal within 2 % at a
/// radiative fraction of 0.3). Where the flame is lower than about a tenth of
/// the diameter the proportional part reaches up to that height instead, so
/// that the flow at the surface stays zero. `z_m <= 0` or `q_w <= 0` gives
/// zero; the radiative fraction is held within 0 to 0.95.
#[must_use]
pub fn heskestad(q_w: f64, radiative_fraction: f64, diameter_m: f64, z_m: f64) -> f64 {
    if q_w <= 0.0 || z_m <= 0.0 {
        return 0.0;
    }
    let diameter = diameter_m.max(0.0);
    let reach = (q_w * 1e-3).powf(0.4);
    let convective = q_w * 1e-3 * (1.0 - radiative_fraction.clamp(0.0, 0.95));
    let origin = 0.083 * reach - 1.02 * diameter;
    let flame = 0.235 * reach - 1.02 * diameter;
    // Smooth maximum of the flame height and zero.
    let near = 0.5 * (flame + (flame * flame + 0.04 * diameter * diameter).sqrt());
    let z = z_m.max(near);
    let far = 0.071 * convective.cbrt() * five_thirds(z - origin) + 0.0018 * convective;
    far * (z_m / near).min(1.0) * fade(q_w)
}

/// Mass flow in a plume at the height `z_m` above the fire, kg/s, after
/// Zukoski 1981 (Zukoski, Kubota, Cetegen 1980/81), from memory.
///
/// `m = 0.071 Q^(1/3) z^(5/3)`, Q the total release in kW, point source at the
/// fire's surface. Range: above the flame; inside it the law reads low.
/// `z_m <= 0` or `q_w <= 0` gives zero.
#[must_use]
pub fn zukoski(q_w: f64, z_m: f64) -> f64 {
    if q_w <= 0.0 || z_m <= 0.0 {
        return 0.0;
    }
    FAR_FIELD * (q_w * 1e-3).cbrt() * five_thirds(z_m) * fade(q_w)
}

/// Mass flow in the plume of the chosen law, kg/s, at `z` m above the fire's
/// surface; `q` total release in W, `diameter` in m. Range and limits: see
/// [`mccaffrey`], [`heskestad`], [`zukoski`].
#[must_use]
pub fn entrainment(law: Law, q: f64, radiative_fraction: f64, diameter: f64, z: f64) -> f64 {
    match law {
        Law::McCaffrey => mccaffrey(q, z),
        Law::Heskestad => heskestad(q, radiative_fraction, diameter, z),
        Law::Zukoski => zukoski(q, z),
    }
}

/// Flow of a fire against a wall or in a corner by the image method, kg/s:
/// `m(n Q, D sqrt(n)) / n`.
///
/// `n` is 1 in the open, 2 at a wall and 4 in a corner for a flame that
/// touches; measured rooms ask for about 1.2 and 1.5. `plume` maps a release
/// in W and a diameter in m to a flow in kg/s. `n` below 1 counts as 1.
#[must_use]
pub fn mirrored(n: f64, q: f64, diameter: f64, plume: impl Fn(f64, f64) -> f64) -> f64 {
    let images = n.max(1.0);
    plume(images * q, diameter * images.sqrt()) / images
}

/// Gas that a hot jet from an opening draws in while it rises, kg/s.
///
/// The jet is taken for a far-field plume `m = 0.071 Q^(1/3) z^(5/3)` (Zukoski,
/// Kubota, Cetegen 1980, from memory) whose virtual origin lies so far below
/// that its flow at the opening is the jet's own: see
/// [`buoyant_entrainment`]. `flow_kg_s` is the jet's flow, `excess_enthalpy_w`
/// the enthalpy flow above that of the gas it rises through, W, `rise_m` the
/// height it rises, m. Never negative; zero where any of the three is.
#[must_use]
pub fn jet_entrainment(flow_kg_s: f64, excess_enthalpy_w: f64, rise_m: f64) -> f64 {
    buoyant_entrainment(flow_kg_s, excess_enthalpy_w, rise_m, FAR_FIELD_SURROUNDINGS)
}

/// Gas that cold gas draws in while it falls through hot gas, kg/s.
///
/// The plume of [`jet_entrainment`] upside down, with surroundings at 20 °C;
/// in hot surroundings use [`buoyant_entrainment`]. `flow` kg/s, `deficit_w`
/// the enthalpy flow that is missing against the gas around it, W, `drop` m.
#[must_use]
pub fn falling_entrainment(flow: f64, deficit_w: f64, drop: f64) -> f64 {
    buoyant_entrainment(flow, deficit_w, drop, FAR_FIELD_SURROUNDINGS)
}

/// Gas drawn in by a buoyant stream over a distance, kg/s, in surroundings of
/// a stated temperature.
///
/// `m(z) = a z^(5/3)`, `a = 0.071 Q^(1/3) (293 K/T)`, Q the excess (or
/// deficit) of enthalpy flow in kW; origin at `z_v = (flow/a)^(3/5)` before
/// the start; drawn in: `m(z_v + distance) - flow`. The temperature factor
/// follows from the same law in its general form,
/// `a ~ (rho^2 g Q/(cp T))^(1/3)` with `rho ~ 1/T`. `surroundings_k` below
/// 100 K counts as 100 K. Flows below a gram per second and excesses below a
/// few hundred watts fade to zero smoothly, since the law itself has infinite
/// slopes there.
#[must_use]
pub fn buoyant_entrainment(flow: f64, excess_w: f64, distance: f64, surroundings_k: f64) -> f64 {
    if flow <= 0.0 || excess_w <= 0.0 || distance <= 0.0 {
        return 0.0;
    }
    let warmth = FAR_FIELD_SURROUNDINGS / surroundings_k.max(100.0);
    let a = FAR_FIELD * warmth * (excess_w * 1e-3).cbrt();
    let origin = (flow / a).powf(0.6);
    let growth = five_thirds(1.0 + distance / origin) - 1.0;
    flow * growth * fade(excess_w) * flow / (flow + FADE_FLOW)
}

fn five_thirds(x: f64) -> f64 {
    let c = x.cbrt();
    x * c * c
}

fn fade(q_w: f64) -> f64 {
    q_w / (q_w + FADE_RELEASE)
}
