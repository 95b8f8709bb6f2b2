//! Flow through vertical openings: exact two-layer rows, well-mixed rows,
//! limits, slopes.
//!
//! Rows computed outside this code from hydrostatic Bernoulli flow with
//! densities of 353/T kg/m3; method Emmons 1988.

#![allow(clippy::unwrap_used)]

use doorglow::physics::hand::well_mixed_flow;
use doorglow::physics::opening_flow::{Bands, GRAVITY, REGULARISATION, Side, bands};

const AIR: f64 = 353.0 / 293.15;

fn close(value: f64, expected: f64, relative: f64) {
    assert!(
        (value - expected).abs() <= relative * expected.abs(),
        "{value} against {expected}, allowed {relative}"
    );
}

fn open_air(pressure: f64) -> Side {
    Side {
        pressure,
        interface: 0.0,
        density: [AIR, AIR],
    }
}

/// Pressure of the room for no net flow, by bisection, and the bands there.
fn balanced(room: Side, sill: f64, head: f64, coefficient_width: f64) -> Bands {
    let (mut low, mut high) = (-200.0, 200.0);
    let at = |pressure: f64| {
        let room = Side { pressure, ..room };
        bands(&room, &open_air(0.0), sill, head, coefficient_width)
    };
    for _ in 0..200 {
        let middle = 0.5 * (low + high);
        if at(middle).net() < 0.0 {
            low = middle;
        } else {
            high = middle;
        }
    }
    at(0.5 * (low + high))
}

fn outflow(bands: &Bands) -> f64 {
    let forward = bands.as_slice().iter().filter(|band| band.forward);
    forward.map(|band| band.flow).sum()
}

#[test]
fn formula_two_layer_door_five_rows() {
    // Interface m, upper °C, neutral plane m, flow each way kg/s: door 0.9 x
    // 2.0 m, coefficient 0.70, lower layer at ambient.
    let rows = [
        (1.2, 150.0, 1.275, 0.638),
        (1.0, 300.0, 1.128, 0.912),
        (0.8, 500.0, 0.996, 1.093),
        (0.2, 600.0, 0.828, 1.342),
        (0.0, 800.0, 0.787, 1.333),
    ];
    for (interface, celsius, plane, flow) in rows {
        let room = Side {
            pressure: 0.0,
            interface,
            density: [AIR, 353.0 / (celsius + 273.15)],
        };
        let found = balanced(room, 0.0, 2.0, 0.9 * 0.70);
        close(outflow(&found), flow, 0.01);
        close(found.neutral_plane().unwrap(), plane, 0.01);
    }
}

#[test]
fn formula_well_mixed_opening_four_rows() {
    let rows = [
        (400.0, 0.514, 0.431),
        (600.0, 0.517, 0.410),
        (800.0, 0.509, 0.394),
        (1000.0, 0.497, 0.380),
    ];
    for (celsius, flow, plane) in rows {
        let density = 353.0 / (celsius + 273.15);
        let room = Side {
            pressure: 0.0,
            interface: 0.0,
            density: [density, density],
        };
        let factor = 1.2 * 1.5 * 1.5_f64.sqrt();
        let found = balanced(room, 0.0, 1.5, 1.2 * 0.68);
        close(outflow(&found) / factor, flow, 0.01);
        close(found.neutral_plane().unwrap() / 1.5, plane, 0.01);
        // The closed form, to the regularisation.
        let (exact, share) = well_mixed_flow(factor, 0.68, AIR, density);
        close(outflow(&found), exact, 1e-4);
        close(found.neutral_plane().unwrap() / 1.5, share, 1e-4);
    }
}

#[test]
fn formula_uniform_difference_is_the_orifice_with_a_bounded_error() {
    for (difference, within) in [(10.0, 1e-8), (0.1, 3e-5), (0.01, 3e-3)] {
        let found = bands(&open_air(difference), &open_air(0.0), 0.4, 1.6, 0.5);
        let exact = 0.5 * 1.2 * (2.0 * AIR * difference).sqrt();
        close(found.net(), exact, within);
        // Relative error at most (e/d)^2 / 4.
        let bound = 0.25 * (REGULARISATION / difference).powi(2);
        assert!(1.0 - found.net() / exact <= bound * 1.000_1 + 1e-12);
    }
    // Never more than the orifice law, and in the right direction.
    for exponent in -12..2 {
        let difference = 10.0_f64.powi(exponent);
        let exact = 0.5 * 1.2 * (2.0 * AIR * difference).sqrt();
        let there = bands(&open_air(difference), &open_air(0.0), 0.4, 1.6, 0.5).net();
        let back = bands(&open_air(0.0), &open_air(difference), 0.4, 1.6, 0.5).net();
        assert!(there > 0.0 && there <= exact * (1.0 + 1e-9));
        close(back, -there, 1e-12);
    }
}

#[test]
fn formula_nothing_flows_at_rest_or_through_no_opening() {
    let still = bands(&open_air(0.0), &open_air(0.0), 0.0, 2.0, 0.9);
    assert!(still.net().abs() < 1e-12);
    assert!(still.as_slice().iter().all(|band| band.flow < 1e-12));
    assert!(still.as_slice().iter().all(|band| band.slope.is_finite()));
    let shut = bands(&open_air(5.0), &open_air(0.0), 1.0, 1.0, 0.9);
    assert!(shut.as_slice().is_empty());
    assert_eq!(
        bands(&open_air(5.0), &open_air(0.0), 0.0, 2.0, 0.0).net(),
        0.0
    );
}

/// Two rooms with layers; pressures chosen to give none to three neutral
/// planes.
fn cases() -> Vec<(Side, Side)> {
    let side = |pressure, interface, lower: f64, upper: f64| Side {
        pressure,
        interface,
        density: [353.0 / lower, 353.0 / upper],
    };
    let mut cases = Vec::new();
    for pressure in [-8.0, -2.0, -0.7, -0.2, 0.0, 0.15, 0.8, 3.0, 12.0] {
        cases.push((
            side(pressure, 1.0, 300.0, 700.0),
            side(0.0, 1.4, 293.0, 400.0),
        ));
        cases.push((
            side(pressure, 0.6, 330.0, 600.0),
            side(0.0, 1.1, 293.0, 900.0),
        ));
        cases.push((
            side(pressure, 1.2, 293.0, 500.0),
            side(0.0, 3.0, 293.0, 320.0),
        ));
        cases.push((
            side(pressure, 1.2, 320.0, 420.0),
            side(0.0, 0.7, 300.0, 1000.0),
        ));
        cases.push((
            side(pressure, 0.0, 600.0, 600.0),
            side(0.0, 2.4, 263.0, 263.0),
        ));
    }
    cases
}

#[test]
fn formula_slopes_against_finite_differences() {
    let mut turns = 0;
    for (first, second) in cases() {
        let at = |pressure: f64| {
            let first = Side { pressure, ..first };
            bands(&first, &second, 0.1, 2.0, 0.6)
        };
        let found = at(first.pressure);
        let slope: f64 = found.as_slice().iter().map(|band| band.slope).sum();
        let step = 1e-5;
        let numeric =
            (at(first.pressure + step).net() - at(first.pressure - step).net()) / (2.0 * step);
        close(slope, numeric, 1e-3);
        turns += usize::from(found.neutral_plane().is_some());
        // Bands lie on one another and cover the opening.
        let parts = found.as_slice();
        assert!((parts[0].bottom - 0.1).abs() < 1e-9);
        assert!((parts[parts.len() - 1].top - 2.0).abs() < 1e-9);
        assert!(
            parts
                .windows(2)
                .all(|p| (p[0].top - p[1].bottom).abs() < 1e-9)
        );
    }
    assert!(turns > 10, "only {turns} cases with a neutral plane");
}

#[test]
fn formula_bands_against_a_midpoint_sum_over_the_height() {
    for (first, second) in cases() {
        let found = bands(&first, &second, 0.1, 2.0, 0.6);
        let n = 40_000;
        let dz = 1.9 / f64::from(n);
        let mut net = 0.0;
        let mut both = 0.0;
        for i in 0..n {
            let z = 0.1 + (f64::from(i) + 0.5) * dz;
            let d = first.pressure_at(z) - second.pressure_at(z);
            let side = if d > 0.0 { first } else { second };
            let density = side.density[usize::from(z > side.interface)];
            let part = 0.6 * dz * (2.0 * density * d.abs()).sqrt();
            net += part.copysign(d);
            both += part;
        }
        assert!(
            (found.net() - net).abs() < 1e-4 * both,
            "{} {net}",
            found.net()
        );
    }
}

#[test]
fn formula_exchanging_the_sides_turns_the_flow() {
    for (first, second) in cases() {
        let there = bands(&first, &second, 0.1, 2.0, 0.6);
        let back = bands(&second, &first, 0.1, 2.0, 0.6);
        assert!((there.net() + back.net()).abs() < 1e-12);
    }
}

#[test]
fn formula_pressure_falls_with_height_by_the_weight_of_the_gas() {
    let side = Side {
        pressure: 3.0,
        interface: 1.0,
        density: [1.2, 0.5],
    };
    close(side.pressure_at(2.0), 3.0 - GRAVITY * 1.7, 1e-12);
    close(side.pressure_at(0.5), 3.0 - GRAVITY * 0.6, 1e-12);
}
