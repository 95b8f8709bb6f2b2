//! Hand rules of the trade, as a cross-check beside the model; the model uses
//! none of them.

/// Acceleration of gravity, m/s2.
const GRAVITY: f64 = 9.81;

/// Opening factor `A sqrt(H)`, m^(5/2), of an opening `width` x `height` in m.
#[must_use]
pub fn opening_factor(width: f64, height: f64) -> f64 {
    let height = height.max(0.0);
    width.max(0.0) * height * height.sqrt()
}

/// Release at flashover after Babrauskas 1980, W: `750 A sqrt(H)` kW.
///
/// `factor` A sqrt(H) in m^(5/2). Fire Technology 16:94, from memory. Half of
/// the air limit; rooms with one ordinary opening.
#[must_use]
pub fn flashover_babrauskas(factor: f64) -> f64 {
    750e3 * factor
}

/// Release at flashover after Thomas 1981, W: `7.8 A_T + 378 A sqrt(H)` kW.
///
/// `surface` A_T in m2 is the inner surface without the opening, `factor` in
/// m^(5/2). Fire and Materials 5:103, from memory.
#[must_use]
pub fn flashover_thomas(surface: f64, factor: f64) -> f64 {
    7.8e3 * surface + 378e3 * factor
}

/// Heat transfer coefficient of a lining for the MQH rules, W/m2/K:
/// `sqrt(k rho c/t)` before the penetration time, `k/d` after it.
///
/// `conductivity` k W/m/K, `density` kg/m3, `heat_capacity` J/kg/K,
/// `thickness` d in m, `time` since ignition in s. It drops by half at the
/// penetration time; the rule is known for that. `k/d` where a number is zero
/// or below.
#[must_use]
pub fn mqh_coefficient(
    conductivity: f64,
    density: f64,
    heat_capacity: f64,
    thickness: f64,
    time: f64,
) -> f64 {
    if time > 0.0 && time < penetration_time(conductivity, density, heat_capacity, thickness) {
        (conductivity * density * heat_capacity / time).sqrt()
    } else {
        conductivity / thickness
    }
}

/// Time heat takes to pass a lining for the MQH rules, s:
/// `(rho c/k) (d/2)^2`; units as in [`mqh_coefficient`].
#[must_use]
pub fn penetration_time(
    conductivity: f64,
    density: f64,
    heat_capacity: f64,
    thickness: f64,
) -> f64 {
    density * heat_capacity / conductivity * (0.5 * thickness) * (0.5 * thickness)
}

/// Release at flashover (a rise of 500 K) after McCaffrey, Quintiere and
/// Harkleroad 1981, W: `610 sqrt(h_k A_T A sqrt(H))` kW.
///
/// `coefficient` h_k in W/m2/K ([`mqh_coefficient`]), `surface` A_T in m2,
/// `factor` in m^(5/2). Fire Technology 17:98, from memory.
#[must_use]
pub fn flashover_mqh(coefficient: f64, surface: f64, factor: f64) -> f64 {
    610e3 * (1e-3 * coefficient * surface * factor).max(0.0).sqrt()
}

/// Rise of the upper layer after McCaffrey, Quintiere and Harkleroad 1981, K:
/// `6.85 [Q^2/(A sqrt(H) h_k A_T)]^(1/3)`, Q in kW, h_k in kW/m2K.
///
/// `release` in W, `coefficient` h_k in W/m2/K, `surface` A_T in m2, `factor`
/// in m^(5/2). From memory; a band of about 30 %. Not above a rise of some 600
/// K and not for fires short of air. Infinite without an opening or surface.
#[must_use]
pub fn mqh_rise(release: f64, coefficient: f64, surface: f64, factor: f64) -> f64 {
    let q = release * 1e-3;
    6.85 * (q * q / (factor * coefficient * 1e-3 * surface)).cbrt()
}

/// Rise with forced draught after Foote, Pagni and Alvares 1985, K:
/// `dT/T0 = 0.63 [Q/(m cp T0)]^0.72 [h_k A_T/(m cp)]^-0.36`, from memory.
///
/// `release` in W, `flow` of air in kg/s, `coefficient` h_k in W/m2/K,
/// `surface` A_T in m2, `ambient` T0 in K; cp is 1000 J/kg/K. Zero without
/// release, infinite without flow or surface.
#[must_use]
pub fn forced_rise(release: f64, flow: f64, coefficient: f64, surface: f64, ambient: f64) -> f64 {
    let capacity = flow * 1000.0;
    let strength = (release / (capacity * ambient)).powf(0.72);
    0.63 * ambient * strength * (coefficient * surface / capacity).powf(-0.36)
}

/// Largest release that an opening can feed inside a room, W:
/// `1500 A sqrt(H)` kW.
///
/// From an inflow of `0.5 A sqrt(H)` kg/s and 3.0 MJ per kg of air; `factor` in
/// m^(5/2). Common handbook rule, from memory.
#[must_use]
pub fn air_limit(factor: f64) -> f64 {
    1500e3 * factor
}

/// Flow of air into a well-mixed hot room through one opening, kg/s, and the
/// height of the neutral plane as a share of the opening's height.
///
/// Exact for hydrostatic Bernoulli flow with equal mass in and out:
/// `m = 2/3 Cd A sqrt(H) rho_a sqrt(2 g (1 - rho_g/rho_a)) /
/// (1 + (rho_a/rho_g)^(1/3))^(3/2)`, `N/H = 1/(1 + (rho_a/rho_g)^(1/3))`.
/// `factor` A sqrt(H) in m^(5/2), densities in kg/m3. No flow, and the plane
/// at half height, where the gas is not the lighter one.
#[must_use]
pub fn well_mixed_flow(
    factor: f64,
    coefficient: f64,
    air_density: f64,
    gas_density: f64,
) -> (f64, f64) {
    if gas_density <= 0.0 || air_density <= gas_density {
        return (0.0, 0.5);
    }
    let spread = 1.0 + (air_density / gas_density).cbrt();
    let drive = (2.0 * GRAVITY * (1.0 - gas_density / air_density)).sqrt();
    let flow = 2.0 / 3.0 * coefficient * factor * air_density * drive / (spread * spread.sqrt());
    (flow, 1.0 / spread)
}

/// Rate of burning of a ventilation-controlled wood fire, kg/s:
/// `5.5 A sqrt(H)` kg/min (Kawagoe 1958, from memory), `factor` in m^(5/2).
#[must_use]
pub fn wood_burning_rate(factor: f64) -> f64 {
    5.5 / 60.0 * factor
}

/// Height of the first smoke above the floor after NFPA 92, m:
/// `z/H = 1.11 - 0.28 ln[t Q^(1/3) H^(-4/3) / (A/H^2)]`, Q in kW.
///
/// `release` steady, W; `floor` A in m2; `height` H in m; `time` in s. From
/// memory. Range `0.9 <= A/H^2 <= 14` and `z/H >= 0.2`; held within 0 and H
/// outside it, H before there is smoke.
#[must_use]
pub fn first_smoke_height(release: f64, floor: f64, height: f64, time: f64) -> f64 {
    if release <= 0.0 || time <= 0.0 || floor <= 0.0 || height <= 0.0 {
        return height;
    }
    let h2 = height * height;
    let x = time * (release * 1e-3).cbrt() / (height * height.cbrt()) / (floor / h2);
    height * (1.11 - 0.28 * x.ln()).clamp(0.0, 1.0)
}

/// Height of the interface in a closed room with a steady fire on the floor
/// after Yamana and Tanaka (Zukoski plume), m:
/// `z = [(2/3) k Q^(1/3) t/A + H^(-2/3)]^(-3/2)`, Q in kW, k = 0.076.
///
/// Arguments as in [`first_smoke_height`]; hot gas taken at 1.0 kg/m3, from
/// memory. Holds until the smoke has filled the room.
#[must_use]
pub fn smoke_layer_height(release: f64, floor: f64, height: f64, time: f64) -> f64 {
    if floor <= 0.0 || height <= 0.0 {
        return height;
    }
    let drawn = 2.0 / 3.0 * 0.076 * (release.max(0.0) * 1e-3).cbrt() * time.max(0.0) / floor;
    (drawn + height.cbrt().powi(-2)).powf(-1.5)
}

/// Heat that a volume of air can release before its oxygen has fallen, J/m3.
///
/// `rho/M_air (x_start - x_end) M_O2 x heat per kg of oxygen`; `air_density` in
/// kg/m3, oxygen as volume fractions, `heat_per_oxygen` in J/kg (13.1e6 after
/// Huggett 1980). About 1.03 MJ/m3 to 15 %, 1.38 MJ/m3 to 13 %. Zero where the
/// end is not below the start.
#[must_use]
pub fn air_store(air_density: f64, x_start: f64, x_end: f64, heat_per_oxygen: f64) -> f64 {
    let moles = air_density / 28.96e-3;
    moles * (x_start - x_end).max(0.0) * 31.998e-3 * heat_per_oxygen
}
