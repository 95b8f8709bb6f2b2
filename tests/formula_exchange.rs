//! Horizontal openings: exchange, flooding, driven flow and their limits.

use doorglow::physics::exchange::{
    Horizontal, depth_factor, epstein_froude, exchange_left, flooding_flow, horizontal,
    thin_exchange,
};

/// Densities of air at 20, 200 and 400 °C, kg/m3.
const COLD: f64 = 1.204;
const WARM: f64 = COLD * 293.15 / 473.15;
const HOT: f64 = COLD * 293.15 / 673.15;

fn close(value: f64, expected: f64, allowed: f64) {
    assert!(
        (value - expected).abs() <= allowed,
        "{value} against {expected}, allowed {allowed}"
    );
}

#[test]
fn formula_epstein_at_six_ratios() {
    // Computed outside this code from the published form.
    let rows = [
        (0.0, 0.055),
        (0.1, 0.058),
        (0.6, 0.095),
        (1.0, 0.089),
        (2.0, 0.065),
        (4.0, 0.036),
    ];
    for (ratio, froude) in rows {
        close(epstein_froude(ratio), froude, 6e-4);
    }
    let peak = (0..1000)
        .map(|i| f64::from(i) * 0.005)
        .max_by(|a, b| epstein_froude(*a).total_cmp(&epstein_froude(*b)))
        .unwrap();
    assert!((0.4..0.8).contains(&peak), "peak at {peak}");
    close(depth_factor(0.0, 1.0), 1.0, 1e-12);
    let diameter = 2.0 / std::f64::consts::PI.sqrt();
    close(depth_factor(diameter, 1.0), 0.089 / 0.055, 0.02);
}

#[test]
fn formula_thin_exchange_of_hatch_and_stair() {
    close(thin_exchange(1.0, WARM, COLD), 0.15, 0.003);
    close(thin_exchange(1.0, HOT, COLD), 0.195, 0.003);
    close(thin_exchange(2.25, WARM, COLD), 0.41, 0.006);
    // Q grows with A^(5/4).
    let ratio = thin_exchange(4.0, WARM, COLD) / thin_exchange(1.0, WARM, COLD);
    close(ratio, 4.0_f64.powf(1.25), 1e-9);
    let stair = horizontal(2.25, 0.6, 3.0, 0.0, WARM, COLD);
    close(stair.exchange, 3.0 * thin_exchange(2.25, WARM, COLD), 1e-12);
    assert_eq!(stair.driven, 0.0);
}

#[test]
fn formula_flooding_ends_the_exchange() {
    let flooding = flooding_flow(1.0, WARM, COLD);
    let still = thin_exchange(1.0, WARM, COLD);
    // Opposed streams with a constant sum of roots: four times; Cooper's fit
    // lies above it for hot gas.
    assert!((3.7..6.0).contains(&(flooding / still)));
    close(exchange_left(0.0, flooding), 1.0, 0.0);
    close(exchange_left(flooding, flooding), 0.0, 1e-20);
    close(exchange_left(-flooding, flooding), 0.0, 1e-20);
    close(exchange_left(2.0 * flooding, flooding), 0.0, 0.0);
    // The pressure at which an orifice passes the flooding flow upwards.
    let speed = flooding / 0.6;
    let pressure = 0.5 * WARM * speed * speed;
    let at = horizontal(1.0, 0.6, 1.0, pressure, WARM, COLD);
    close(at.driven, flooding, 1e-4 * flooding);
    assert!(at.exchange < 1e-6 * still);
    let below = horizontal(1.0, 0.6, 1.0, 0.25 * pressure, WARM, COLD);
    assert!(below.exchange > 0.2 * still && below.exchange < 0.35 * still);
    // The opposed stream never exceeds what the roots allow.
    for i in 0..=100 {
        let net = f64::from(i) * 0.01 * flooding;
        let each = still * exchange_left(net, flooding);
        assert!((net + each).sqrt() + each.sqrt() < 1.3 * flooding.sqrt());
    }
}

#[test]
fn formula_exchange_vanishes_where_it_must() {
    // Light gas on top, equal gas, no area, nonsense densities.
    assert_eq!(horizontal(1.0, 0.6, 1.0, 0.0, COLD, HOT).exchange, 0.0);
    assert_eq!(horizontal(1.0, 0.6, 1.0, 0.0, COLD, COLD).exchange, 0.0);
    for nothing in [
        horizontal(0.0, 0.6, 1.0, 5.0, HOT, COLD),
        horizontal(-1.0, 0.6, 1.0, 5.0, HOT, COLD),
        horizontal(1.0, 0.6, 1.0, 5.0, 0.0, COLD),
        horizontal(f64::NAN, 0.6, 1.0, 5.0, HOT, COLD),
    ] {
        assert_eq!(nothing, Horizontal::default());
    }
    let barred = horizontal(1.0, 0.6, 0.0, 0.0, HOT, COLD);
    assert_eq!(barred.exchange, 0.0);
}

#[test]
fn formula_driven_flow_follows_the_orifice() {
    let up = horizontal(1.0, 0.6, 1.0, 5.0, HOT, COLD);
    close(up.driven, 0.6 * (10.0 / HOT).sqrt(), 1e-5);
    let down = horizontal(1.0, 0.6, 1.0, -5.0, HOT, COLD);
    close(down.driven, -0.6 * (10.0 / COLD).sqrt(), 1e-5);
    assert_eq!((up.exchange, down.exchange), (0.0, 0.0));
}

#[test]
fn formula_slope_is_the_derivative_and_nothing_jumps() {
    for (below, above) in [(HOT, COLD), (COLD, HOT), (WARM, COLD), (COLD, COLD)] {
        let at = |dp: f64| horizontal(1.3, 0.62, 2.0, dp, below, above);
        for i in -400..=400 {
            let x = f64::from(i) / 100.0;
            // Steps finer near zero, where the regularisation lies.
            let dp = x * x * x * 0.05;
            let step = 1e-7 * (1.0 + dp.abs() * 10.0);
            let (left, right) = (at(dp - step), at(dp + step));
            let slope = (right.driven - left.driven) / (2.0 * step);
            close(slope, at(dp).slope, 2e-5 * at(dp).slope + 1e-9);
            assert!(at(dp).slope > 0.0);
            assert!((right.exchange - left.exchange).abs() < 200.0 * step);
        }
    }
}

#[test]
fn formula_exchange_is_smooth_in_the_density_difference() {
    let mut before = horizontal(1.0, 0.6, 1.0, 0.0, 1.21, COLD).exchange;
    for i in 1..2000 {
        let below = 1.21 - 1e-5 * f64::from(i);
        let here = horizontal(1.0, 0.6, 1.0, 0.0, below, COLD).exchange;
        assert!(here >= before && here - before < 4e-5, "{below}");
        before = here;
    }
}

#[test]
fn formula_exchange_falls_steadily_with_pressure() {
    let mut before = f64::INFINITY;
    for i in 0..2000 {
        let dp = 1e-3 * f64::from(i);
        let here = horizontal(1.0, 0.6, 1.0, dp, HOT, COLD).exchange;
        assert!(here <= before && here >= 0.0);
        before = here;
    }
    assert_eq!(before, 0.0);
}
