//! Fans with a straight net curve, openings in series, and the working point of
//! a fan and the openings that its air leaves by.
//!
//! The net curve of a positive-pressure fan is what goes in through the
//! doorway, spill-back already taken off: 2 to 5 m3/s at no pressure (from
//! memory), some tens of Pa at a dead end. Sources differ widely.

/// Share of the dead-end pressure over which the end of the curve is rounded
/// (choice).
const END: f64 = 0.05;

/// A fan's flow and how it gives way to pressure.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct FanFlow {
    /// Volume flow, m3/s, never negative.
    pub flow: f64,
    /// Fall of the flow with the pressure rise, m3/s/Pa, never negative.
    pub slope: f64,
}

/// Flow of a fan against a pressure rise: `free_flow (1 - rise/dead_end)`,
/// exact up to 95 % of the dead-end pressure, then rounded to zero at 105 %.
///
/// `free_flow` in m3/s, `dead_end` pressure and `rise` (delivery less intake)
/// in Pa. Assisted (`rise` below zero) the line goes on; range down to about
/// minus the dead-end pressure. Beyond the dead end nothing comes back: the air
/// that returns through the doorway past the fan belongs to the opening. A fan
/// without dead-end pressure or flow gives nothing.
#[must_use]
pub fn curve(free_flow: f64, dead_end: f64, rise: f64) -> FanFlow {
    if !(free_flow > 0.0 && dead_end > 0.0) {
        return FanFlow::default();
    }
    let left = 1.0 - rise / dead_end;
    let (share, steep) = if left >= END {
        (left, 1.0)
    } else if left <= -END {
        (0.0, 0.0)
    } else {
        let over = left + END;
        (over * over / (4.0 * END), over / (2.0 * END))
    };
    FanFlow {
        flow: free_flow * share,
        slope: free_flow / dead_end * steep,
    }
}

/// Area of one opening that resists as several one after the other, m2:
/// `1/A^2 = sum 1/A_i^2`, all of one coefficient. Zero when one is shut;
/// infinite for none.
#[must_use]
pub fn area_in_series(areas: &[f64]) -> f64 {
    if areas.iter().any(|area| *area <= 0.0) {
        return 0.0;
    }
    1.0 / areas.iter().map(|a| 1.0 / (a * a)).sum::<f64>().sqrt()
}

/// Where a fan and the openings behind it meet: flow in m3/s and pressure rise
/// in Pa at the fan.
///
/// The straight curve of [`curve`] meets `Q = C A sqrt(2 (p - back)/rho)`;
/// `area` in m2 ([`area_in_series`] for several), `density` in kg/m3 of the air
/// that flows, `back` the pressure (wind) on the last opening in Pa. With no
/// way out, or wind on it above the dead-end pressure, the flow is zero at the
/// dead-end pressure. Exact where the flow is above 5 % of the free one.
#[must_use]
pub fn working_point(
    free_flow: f64,
    dead_end: f64,
    area: f64,
    coefficient: f64,
    density: f64,
    back: f64,
) -> (f64, f64) {
    let reach = free_flow * (1.0 - back / dead_end);
    let way = coefficient * area;
    if !(free_flow > 0.0 && dead_end > 0.0 && way > 0.0 && reach > 0.0) {
        return (0.0, dead_end.max(0.0));
    }
    let resistance = 0.5 * density / (way * way);
    let bend = free_flow * resistance / dead_end;
    let flow = 2.0 * reach / (1.0 + (1.0 + 4.0 * bend * reach).sqrt());
    (flow, back + resistance * flow * flow)
}
