//! The conduction grid against exact solutions.
//!
//! Exact values from tests/reference/conduction.py (scipy, Carslaw and Jaeger
//! 1959). Thick courses stand in for a semi-infinite solid.

#![allow(clippy::unwrap_used)]

use doorglow::physics::conduction::{Course, Grid, grid, rates};

const GYPSUM: Course = Course {
    thickness: 0.0125,
    conductivity: 0.16,
    density: 790.0,
    heat_capacity: 900.0,
};
const CONCRETE: Course = Course {
    thickness: 0.15,
    conductivity: 1.6,
    density: 2200.0,
    heat_capacity: 840.0,
};
const STEEL: Course = Course {
    thickness: 0.002,
    conductivity: 45.0,
    density: 7800.0,
    heat_capacity: 480.0,
};
const WOOL: Course = Course {
    thickness: 0.1,
    conductivity: 0.04,
    density: 50.0,
    heat_capacity: 840.0,
};

fn close(value: f64, expected: f64, relative: f64) {
    assert!(
        (value - expected).abs() <= relative * expected.abs(),
        "{value} against {expected}, allowed {relative}"
    );
}

/// Runs the grid from zero with classic fourth-order steps.
fn run(grid: &Grid, seconds: f64, step: f64, flux: impl Fn(f64, f64) -> (f64, f64)) -> Vec<f64> {
    let n = grid.nodes();
    let mut t = vec![0.0; n];
    let slope = |t: &[f64]| {
        let mut out = vec![0.0; n];
        let (front, back) = flux(t[0], t[n - 1]);
        rates(grid, t, front, back, &mut out);
        out
    };
    let moved = |t: &[f64], k: &[f64], h: f64| -> Vec<f64> {
        t.iter().zip(k).map(|(t, k)| t + h * k).collect()
    };
    let mut now = 0.5 * step;
    while now < seconds {
        now += step;
        let k1 = slope(&t);
        let k2 = slope(&moved(&t, &k1, 0.5 * step));
        let k3 = slope(&moved(&t, &k2, 0.5 * step));
        let k4 = slope(&moved(&t, &k3, step));
        for i in 0..n {
            t[i] += step / 6.0 * (k1[i] + 2.0 * k2[i] + 2.0 * k3[i] + k4[i]);
        }
    }
    t
}

/// Four times the thickness: nothing of two minutes' heating gets through.
fn semi_infinite(course: Course) -> Grid {
    let thickness = 4.0 * course.thickness;
    grid(
        &[Course {
            thickness,
            ..course
        }],
        false,
    )
    .unwrap()
}

/// Even cells by the textbook rule, to compare with.
fn fine(course: Course, cells: usize) -> Grid {
    let dx = course.thickness / cells as f64;
    let mut capacity = vec![dx * course.density * course.heat_capacity; cells + 1];
    capacity[0] *= 0.5;
    capacity[cells] *= 0.5;
    Grid {
        capacity,
        conductance: vec![course.conductivity / dx; cells],
        depth: (0..=cells).map(|i| i as f64 * dx).collect(),
    }
}

/// Upper bound of the fastest decay of a grid, 1/s (Gershgorin).
fn fastest(grid: &Grid) -> f64 {
    (0..grid.nodes())
        .map(|i| {
            let before = if i > 0 { grid.conductance[i - 1] } else { 0.0 };
            let after = grid.conductance.get(i).copied().unwrap_or(0.0);
            2.0 * (before + after) / grid.capacity[i]
        })
        .fold(0.0, f64::max)
}

#[test]
fn verify_semi_infinite_solid_under_constant_flux() {
    let gypsum = [
        (10.0, 105.7938),
        (30.0, 183.2403),
        (60.0, 259.1409),
        (120.0, 366.4805),
    ];
    let concrete = [
        (10.0, 20.7512),
        (30.0, 35.9422),
        (60.0, 50.8300),
        (120.0, 71.8844),
    ];
    for (course, rows) in [(GYPSUM, gypsum), (CONCRETE, concrete)] {
        let grid = semi_infinite(course);
        for (time, exact) in rows {
            close(run(&grid, time, 0.1, |_, _| (10e3, 0.0))[0], exact, 0.008);
        }
    }
}

#[test]
fn verify_semi_infinite_solid_under_hot_gas() {
    let gypsum = [
        (10.0, 126.1676),
        (30.0, 188.8380),
        (60.0, 234.8577),
        (120.0, 282.6535),
    ];
    let concrete = [
        (10.0, 29.6659),
        (30.0, 49.6561),
        (60.0, 67.9647),
        (120.0, 91.8904),
    ];
    for (course, rows) in [(GYPSUM, gypsum), (CONCRETE, concrete)] {
        let grid = semi_infinite(course);
        for (time, exact) in rows {
            let face = run(&grid, time, 0.1, |t, _| (30.0 * (500.0 - t), 0.0))[0];
            close(face, exact, 0.008);
        }
    }
}

#[test]
fn verify_board_heated_through_against_a_fine_grid() {
    let gas = |front: f64, back: f64| (30.0 * (500.0 - front), -10.0 * back);
    let reference = fine(GYPSUM, 50);
    for two_sided in [false, true] {
        let grid = grid(&[GYPSUM], two_sided).unwrap();
        for time in [60.0, 300.0, 900.0, 1800.0] {
            let coarse = run(&grid, time, 0.1, gas);
            let exact = run(&reference, time, 0.1, gas);
            close(coarse[0], exact[0], 0.008);
            let back = coarse[grid.nodes() - 1] - exact[50];
            assert!(back.abs() < 3.5, "{time} s: back face off by {back} K");
        }
    }
}

#[test]
fn verify_steady_profile_through_two_courses_is_exact() {
    let lining = [GYPSUM, WOOL];
    let flux = 400.0 / (0.0125 / 0.16 + 0.1 / 0.04);
    for two_sided in [false, true] {
        let grid = grid(&lining, two_sided).unwrap();
        close(grid.transmittance(), flux / 400.0, 1e-12);
        // Start from the exact profile: nothing moves.
        let profile: Vec<f64> = grid
            .depth
            .iter()
            .map(|x| {
                let resistance = x.min(0.0125) / 0.16 + (x - 0.0125).max(0.0) / 0.04;
                700.0 - flux * resistance
            })
            .collect();
        let mut out = vec![1.0; grid.nodes()];
        rates(&grid, &profile, flux, -flux, &mut out);
        assert!(out.iter().all(|rate| rate.abs() < 1e-9), "{out:?}");
    }
}

#[test]
fn conserve_heat_of_a_lining_equals_what_entered() {
    let walls = [
        vec![GYPSUM],
        vec![CONCRETE, GYPSUM],
        vec![STEEL, WOOL, STEEL],
        vec![STEEL],
    ];
    for courses in walls {
        let whole: f64 = courses
            .iter()
            .map(|c| c.thickness * c.density * c.heat_capacity)
            .sum();
        for two_sided in [false, true] {
            let grid = grid(&courses, two_sided).unwrap();
            close(grid.capacity.iter().sum(), whole, 1e-12);
            let t = run(&grid, 100.0, 0.1, |_, _| (5e3, -1e3));
            close(grid.heat(&t), 4e3 * 100.0, 1e-10);
        }
    }
}

#[test]
fn formula_grid_is_small_and_does_not_limit_the_step() {
    let cases = [
        (vec![GYPSUM], false, 7),
        (vec![GYPSUM], true, 9),
        (vec![CONCRETE], false, 13),
        (vec![STEEL], false, 1),
        (vec![STEEL, WOOL, STEEL], false, 12),
        (vec![GYPSUM, WOOL, GYPSUM], true, 21),
    ];
    for (courses, two_sided, nodes) in cases {
        let grid = grid(&courses, two_sided).unwrap();
        assert_eq!(grid.nodes(), nodes, "{courses:?}");
        assert!(fastest(&grid) < 1.0, "{courses:?}: {}", fastest(&grid));
        assert_eq!(grid.conductance.len() + 1, nodes);
        assert_eq!(grid.depth.len(), nodes);
    }
}

#[test]
fn formula_grid_refuses_what_is_no_lining() {
    assert!(grid(&[], false).is_none());
    let broken = Course {
        conductivity: 0.0,
        ..GYPSUM
    };
    assert!(grid(&[broken], true).is_none());
    assert_eq!(grid(&[broken, GYPSUM], false), grid(&[GYPSUM], false));
    assert!(grid(&[STEEL], false).unwrap().transmittance().is_infinite());
}
