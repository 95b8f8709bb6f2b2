//! Wind, stack pressure, leakage from an air-tightness test and flames outside.

use doorglow::physics::airtightness::{effective_area, leakage_flow, orifice_area, test_flow};
use doorglow::physics::external_flame::height_above_head;
use doorglow::physics::wind::{
    PressureCoefficients, angle_between, column_difference, dynamic_pressure, facade_pressure,
    roof_pressure, stack_pressure,
};

fn close(value: f64, expected: f64, allowed: f64) {
    assert!(
        (value - expected).abs() <= allowed,
        "{value} against {expected}, allowed {allowed}"
    );
}

#[test]
fn formula_wind_on_the_windward_facade() {
    for (speed, pressure) in [(5.0, 10.5), (9.0, 34.0), (13.0, 71.0)] {
        close(facade_pressure(speed, 0.0, 1.2), pressure, 0.01 * pressure);
    }
    close(dynamic_pressure(9.0, 1.2), 48.6, 1e-9);
    // 9 m/s from windward window to lee or roof: 48.6 Pa in all.
    close(
        facade_pressure(9.0, 0.0, 1.2) - roof_pressure(9.0, 1.2),
        48.6,
        1e-9,
    );
    assert_eq!(facade_pressure(0.0, 0.0, 1.2), 0.0);
}

#[test]
fn formula_pressure_coefficient_over_the_angle() {
    let cp = PressureCoefficients::default();
    for (angle, value) in [(0.0, 0.7), (90.0, -0.5), (180.0, -0.3), (270.0, -0.5)] {
        close(cp.facade(angle), value, 1e-9);
    }
    close(cp.facade(45.0), 0.35, 0.05);
    let mut slope_before = 0.0;
    for i in 0..1800 {
        let angle = f64::from(i) * 0.1;
        close(cp.facade(angle), cp.facade(-angle), 1e-12);
        close(cp.facade(angle), cp.facade(angle + 360.0), 1e-12);
        let slope = (cp.facade(angle + 0.1) - cp.facade(angle)) / 0.1;
        assert!((slope - slope_before).abs() < 2e-3, "corner at {angle}");
        assert!(if angle < 90.0 {
            slope <= 0.0
        } else {
            slope >= 0.0
        });
        slope_before = slope;
    }
}

#[test]
fn formula_angle_between_wind_and_facade() {
    close(angle_between(350.0, 10.0), 20.0, 1e-12);
    close(angle_between(10.0, 350.0), 20.0, 1e-12);
    close(angle_between(-90.0, 90.0), 180.0, 1e-12);
    close(angle_between(725.0, 5.0), 0.0, 1e-12);
}

#[test]
fn formula_stack_pressure_and_hydrostatics() {
    let t0 = 273.15;
    let rows = [
        (-10.0, 20.0, 15.0, 20.0),
        (20.0, 300.0, 1.2, 6.9),
        (20.0, 600.0, 1.2, 9.4),
        (20.0, 900.0, 1.2, 10.6),
    ];
    for (outside, inside, height, pressure) in rows {
        let hand = stack_pressure(outside + t0, inside + t0, height);
        close(hand, pressure, 0.02 * pressure);
        let exact = column_difference(101_325.0, outside + t0, inside + t0, height);
        close(hand, exact, 5e-3 * exact);
    }
    assert_eq!(stack_pressure(280.0, 280.0, 30.0), 0.0);
    assert!(stack_pressure(303.0, 293.0, 10.0) < 0.0);
}

#[test]
fn formula_leakage_from_air_changes() {
    // 5 per hour at 50 Pa over 250 m3.
    close(test_flow(5.0, 250.0), 0.347, 1e-3);
    close(orifice_area(5.0, 250.0, 1.2), 0.063, 6e-4);
    close(effective_area(5.0, 250.0, 1.2), 0.026, 3e-4);
    close(leakage_flow(5.0, 250.0, 50.0), test_flow(5.0, 250.0), 1e-12);
    close(
        leakage_flow(5.0, 250.0, -4.0),
        -test_flow(5.0, 250.0) * 0.08_f64.powf(0.65),
        1e-12,
    );
    assert_eq!(leakage_flow(5.0, 250.0, 0.0), 0.0);
    // Below 50 Pa the power law passes less than the orifice of equal flow.
    let area = orifice_area(5.0, 250.0, 1.2);
    for (pressure, ratio) in [(50.0, 1.0), (10.0, 0.786), (5.0, 0.708)] {
        let orifice = area * 0.6 * (2.0_f64 * pressure / 1.2).sqrt();
        close(leakage_flow(5.0, 250.0, pressure) / orifice, ratio, 1e-3);
    }
}

#[test]
fn formula_flame_above_the_head() {
    close(height_above_head(3e6, 0.9, 2.0), 2.24, 0.01);
    close(height_above_head(2e6, 0.9, 2.0), 1.24, 0.01);
    for none in [0.0, -1e6, 1e5] {
        assert_eq!(height_above_head(none, 0.9, 2.0), 0.0);
    }
    assert_eq!(height_above_head(3e6, 0.0, 2.0), 0.0);
    assert_eq!(height_above_head(f64::NAN, 0.9, 2.0), 0.0);
}
