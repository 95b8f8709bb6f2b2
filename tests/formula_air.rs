//! Leakage pressure, humidity, visibility and the cold front.

use doorglow::physics::cold_front::{speed, travel_time};
use doorglow::physics::humidity::{saturation_pressure, vapour_fraction};
use doorglow::physics::leakage::{
    expansion, orifice, orifice_difference, pressure_from_heating, sealed_pressure_rate,
};
use doorglow::physics::visibility::{LIT_SIGN, REFLECTING, visibility};

fn close(value: f64, expected: f64, relative: f64) {
    assert!(
        (value - expected).abs() <= relative * expected.abs(),
        "{value} against {expected}, allowed {relative}"
    );
}

#[test]
fn formula_leaky_room_under_100_kw_of_net_heating() {
    // Cd 0.6, 1.2 kg/m3, 101325 Pa; table computed outside this code.
    for (area, pressure) in [(0.1, 13.0), (0.05, 53.0), (0.02, 331.0), (0.01, 1324.0)] {
        let value = pressure_from_heating(100e3, area, 0.6, 1.2, 101_325.0);
        close(value, pressure, 0.02);
    }
    close(expansion(100e3, 101_325.0), 0.28, 0.01);
    // Sealed 28.8 m3: 1390 Pa/s.
    close(sealed_pressure_rate(100e3, 28.8), 1390.0, 2e-3);
    assert!(pressure_from_heating(-100e3, 0.1, 0.6, 1.2, 101_325.0) < 0.0);
    assert_eq!(pressure_from_heating(0.0, 0.0, 0.6, 1.2, 101_325.0), 0.0);
}

#[test]
fn formula_orifice_and_its_inverse() {
    // 3.5 m3/s through 1.8 m2 (Cd 0.62, 1.2 kg/m3): 5.9 Pa.
    close(orifice_difference(3.5, 1.8, 0.62, 1.2), 5.9, 2e-3);
    // 1 m2 at 5/10/20/25 Pa: 1.8/2.5/3.6/4.0 m3/s.
    for (pressure, flow) in [(5.0, 1.8), (10.0, 2.5), (20.0, 3.6), (25.0, 4.0)] {
        close(orifice(pressure, 1.0, 0.62, 1.2), flow, 0.015);
    }
    let there = orifice(-7.3, 0.4, 0.6, 1.1);
    close(orifice_difference(there, 0.4, 0.6, 1.1), -7.3, 1e-12);
    assert_eq!(orifice(0.0, 1.0, 0.6, 1.2), 0.0);
}

#[test]
fn formula_saturation_pressure_against_coolprop() {
    // CoolProp 8.0.0: PropsSI('P', 'T', T, 'Q', 0, 'Water').
    let rows = [
        (273.16, 611.654_77),
        (283.15, 1_228.198_93),
        (293.15, 2_339.318_18),
        (303.15, 4_246.970_84),
        (323.15, 12_351.945_8),
        (373.15, 101_417.997),
        (423.15, 476_164.538),
    ];
    for (t, pressure) in rows {
        close(saturation_pressure(t), pressure, 3e-4);
    }
    // Supercooled water at -20 °C: 125.5 Pa (Smithsonian tables, from memory).
    close(saturation_pressure(253.15), 125.5, 0.01);
    assert!(saturation_pressure(1.0).is_finite());
    close(saturation_pressure(900.0), 22.064e6, 1e-9);
}

#[test]
fn formula_vapour_in_moist_air() {
    // 20 °C, 50 %: 1170 Pa of 101325 is 1.154 %.
    close(vapour_fraction(293.15, 0.5, 101_325.0), 0.011_543, 1e-3);
    assert_eq!(vapour_fraction(293.15, 0.0, 101_325.0), 0.0);
    assert_eq!(vapour_fraction(400.0, 1.0, 101_325.0), 1.0);
    assert_eq!(vapour_fraction(293.15, 0.5, 0.0), 0.0);
}

#[test]
fn formula_visibility_row() {
    // Soot 0.05/0.1/0.5/1 g/m3: 6.9/3.4/0.7/0.35 m to reflecting things.
    for (soot, sight) in [(0.05e-3, 6.9), (0.1e-3, 3.4), (0.5e-3, 0.7), (1e-3, 0.35)] {
        close(visibility(REFLECTING, soot, 30.0), sight, 0.02);
    }
    close(
        visibility(LIT_SIGN, 1e-3, 30.0),
        8.0 / 3.0 * visibility(REFLECTING, 1e-3, 30.0),
        1e-12,
    );
    assert_eq!(visibility(REFLECTING, 0.0, 30.0), 30.0);
    assert_eq!(visibility(REFLECTING, -1.0, 30.0), 30.0);
    assert_eq!(visibility(REFLECTING, 1e-9, 30.0), 30.0);
}

#[test]
fn formula_cold_front_row() {
    // 2.4 m, gas 120/200/400/600 °C, Fr 0.32 and 0.44.
    let rows = [
        (120.0, 0.90, 1.25),
        (200.0, 1.2, 1.7),
        (400.0, 1.8, 2.4),
        (600.0, 2.2, 3.0),
    ];
    for (celsius, slow, fast) in rows {
        let gas = 353.0 / (celsius + 273.15);
        let air = 353.0 / 293.15;
        assert!((speed(0.32, air, gas, 2.4) - slow).abs() < 0.05);
        assert!((speed(0.44, air, gas, 2.4) - fast).abs() < 0.05);
    }
    assert_eq!(speed(0.35, 1.0, 1.2, 2.4), 0.0);
    assert_eq!(speed(0.35, 1.2, 0.0, 2.4), 0.0);
    assert_eq!(travel_time(5.0, 2.0), 2.5);
    assert_eq!(travel_time(5.0, 0.0), f64::INFINITY);
    assert_eq!(travel_time(0.0, 0.0), 0.0);
}
