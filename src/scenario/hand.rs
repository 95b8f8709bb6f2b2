//! Hand formulas that `doorglow check` sets beside a building. Cross-checks
//! and bands only; no run uses them.

use crate::plan::{Lining, Room};

/// Air that a fire can burn through an opening, W, with area A (m2) and height
/// H (m): `0.5 A sqrt(H)` kg/s of air times 3.0 MJ/kg of air, i.e.
/// `1500 A sqrt(H)` kW. Kawagoe 1958; Huggett 1980; from memory.
pub(super) fn air_limit(factor: f64) -> f64 {
    1.5e6 * factor
}

/// Opening factor `A sqrt(H)`, m^(5/2), of a clear width and a height, m.
pub(super) fn opening_factor(width: f64, height: f64) -> f64 {
    width * height * height.max(0.0).sqrt()
}

/// Heat that can be burned in one cubic metre of air at 20 °C before oxygen is
/// down to 15 %, J/m3 (1.2 kg/m3 x 3.0 MJ/kg x share of the oxygen used).
pub(super) const HEAT_TO_15_PERCENT: f64 = 1.03e6;
/// As [`HEAT_TO_15_PERCENT`], down to 13 %.
pub(super) const HEAT_TO_13_PERCENT: f64 = 1.38e6;

/// Heat release that makes a room flash over, W, by Babrauskas 1980 (Fire
/// Technol 16:94): `750 A sqrt(H)` kW.
pub(super) fn flashover_babrauskas(factor: f64) -> f64 {
    750e3 * factor
}

/// By Thomas 1981 (Fire Mater 5:103): `7.8 A_T + 378 A sqrt(H)` kW; `surface`
/// is the inner surface without openings, m2.
pub(super) fn flashover_thomas(factor: f64, surface: f64) -> f64 {
    (7.8 * surface + 378.0 * factor) * 1e3
}

/// By McCaffrey, Quintiere and Harkleroad 1981 (Fire Technol 17:98):
/// `610 sqrt(h_k A_T A sqrt(H))` kW with `h_k` in kW/m2/K, at 120 s.
pub(super) fn flashover_mqh(factor: f64, surface: f64, conductance: f64) -> f64 {
    610e3 * (conductance / 1e3 * surface * factor).sqrt()
}

/// Conductance of a lining's first course after a time, W/m2/K:
/// `sqrt(k rho c / t)` while the heat has not come through, `k / d` after.
pub(super) fn conductance(lining: &Lining, time: f64) -> Option<f64> {
    let course = lining.courses.first()?;
    let through = course.density * course.heat_capacity / course.conductivity
        * (course.thickness / 2.0).powi(2);
    Some(if time < through {
        (course.conductivity * course.density * course.heat_capacity / time).sqrt()
    } else {
        course.conductivity / course.thickness
    })
}

/// Inner surface of a room without its open openings, m2.
pub(super) fn inner_surface(room: &Room, open_area: f64) -> f64 {
    2.0 * room.floor_area() + room.perimeter() * room.height - open_area
}

/// Time at which a fire that grows as `alpha t^2` up to a peak has released a
/// heat, s.
pub(super) fn time_of_heat(alpha: f64, peak: f64, heat: f64) -> f64 {
    let reached = (peak / alpha).sqrt();
    let before = alpha * reached.powi(3) / 3.0;
    if heat <= before {
        (3.0 * heat / alpha).cbrt()
    } else {
        reached + (heat - before) / peak
    }
}

#[cfg(test)]
#[allow(clippy::unwrap_used)]
mod tests {
    use super::*;
    use crate::catalogue::catalogue;
    use crate::plan::Course;

    fn close(value: f64, expected: f64, within: f64) {
        assert!(
            (value / expected - 1.0).abs() < within,
            "{value} is not {expected}"
        );
    }

    /// Room 4 x 3 x 2.4 m, door 0.9 x 2.0 m, gypsum 16 mm: Babrauskas 1909,
    /// Thomas 1397, MQH 1276 kW at 120 s, air 3.82 MW.
    #[test]
    fn formula_flashover_of_the_reference_room() {
        let lining = Lining {
            name: "gypsum 16 mm".to_owned(),
            emissivity: 0.9,
            courses: vec![Course {
                thickness: 0.016,
                conductivity: 0.16,
                density: 790.0,
                heat_capacity: 900.0,
            }],
        };
        let factor = opening_factor(0.9, 2.0);
        close(factor, 2.546, 1e-3);
        let surface = 2.0 * 12.0 + 14.0 * 2.4 - 1.8;
        close(surface, 55.8, 1e-6);
        close(air_limit(factor), 3.82e6, 1e-3);
        close(flashover_babrauskas(factor), 1909e3, 1e-3);
        close(flashover_thomas(factor, surface), 1397e3, 1e-3);
        let early = conductance(&lining, 120.0).unwrap();
        close(early, 30.8, 2e-3);
        close(flashover_mqh(factor, surface, early), 1276e3, 2e-3);
        let late = conductance(&lining, 600.0).unwrap();
        close(flashover_mqh(factor, surface, late), 727e3, 2e-3);
    }

    /// 272 m3, fast growth: 262 s to 15 %, 288 s to 13 %.
    #[test]
    fn formula_time_until_short_of_air() {
        let fast = catalogue().growth("fast").unwrap();
        close(
            time_of_heat(fast, 1e9, 272.0 * HEAT_TO_15_PERCENT),
            262.0,
            5e-3,
        );
        close(
            time_of_heat(fast, 1e9, 272.0 * HEAT_TO_13_PERCENT),
            288.0,
            5e-3,
        );
    }
}
