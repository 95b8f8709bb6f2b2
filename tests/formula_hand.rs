//! Hand rules against the tables of flashover releases, temperatures, air
//! limits and smoke filling.
//!
//! Published forms (Babrauskas 1980; Thomas 1981; McCaffrey, Quintiere,
//! Harkleroad 1981; Foote, Pagni, Alvares 1985; NFPA 92; Yamana-Tanaka) from
//! memory; the tables were computed from them outside this code.

use doorglow::physics::growth::{
    FAST, MEDIUM, SLOW, ULTRA_FAST, burn_out, t_squared, t_squared_energy, time_of_cap,
};
use doorglow::physics::hand::{
    air_limit, air_store, first_smoke_height, flashover_babrauskas, flashover_mqh,
    flashover_thomas, forced_rise, mqh_coefficient, mqh_rise, opening_factor, penetration_time,
    smoke_layer_height, well_mixed_flow, wood_burning_rate,
};

fn close(value: f64, expected: f64, relative: f64) {
    assert!(
        (value - expected).abs() <= relative * expected.abs(),
        "{value} against {expected}, allowed {relative}"
    );
}

/// Gypsum 16 mm of the table: k, rho, c, d.
fn gypsum(time: f64) -> f64 {
    mqh_coefficient(0.16, 790.0, 900.0, 0.016, time)
}

#[test]
fn formula_flashover_releases_of_three_rooms() {
    // Opening w x h, surface without it, kW: Babrauskas, Thomas, MQH at 120 s
    // and steady.
    let rows = [
        (0.9, 2.0, 55.8, [1909.0, 1397.0, 1276.0, 727.0]),
        (0.8, 2.0, 44.48, [1697.0, 1202.0, 1074.0, 612.0]),
        (1.5, 1.5, 68.1, [2067.0, 1573.0, 1466.0, 835.0]),
    ];
    for (w, h, surface, [babrauskas, thomas, mqh, steady]) in rows {
        let factor = opening_factor(w, h);
        close(flashover_babrauskas(factor), babrauskas * 1e3, 1e-3);
        close(flashover_thomas(surface, factor), thomas * 1e3, 1e-3);
        close(
            flashover_mqh(gypsum(120.0), surface, factor),
            mqh * 1e3,
            2e-3,
        );
        close(
            flashover_mqh(gypsum(1e4), surface, factor),
            steady * 1e3,
            2e-3,
        );
    }
    close(opening_factor(0.9, 2.0), 2.546, 1e-3);
}

#[test]
fn formula_mqh_rise_of_room_r1() {
    close(penetration_time(0.16, 790.0, 900.0, 0.016), 284.0, 2e-3);
    close(gypsum(120.0), 30.8, 1e-3);
    close(gypsum(300.0), 10.0, 1e-9);
    let factor = opening_factor(0.9, 2.0);
    let rows = [
        (300e3, 188.0, 273.0),
        (500e3, 264.0, 384.0),
        (750e3, 346.0, 503.0),
        (1000e3, 419.0, 609.0),
    ];
    for (q, early, steady) in rows {
        close(mqh_rise(q, gypsum(120.0), 55.8, factor), early, 3e-3);
        close(mqh_rise(q, gypsum(1e4), 55.8, factor), steady, 3e-3);
    }
}

#[test]
fn formula_forced_draught_rise_of_room_r1() {
    let rows = [
        (500e3, 1.27, 307.0),
        (500e3, 3.0, 225.0),
        (500e3, 4.2, 200.0),
        (1000e3, 1.27, 506.0),
        (1000e3, 3.0, 371.0),
        (1000e3, 4.2, 329.0),
    ];
    for (q, flow, rise) in rows {
        close(forced_rise(q, flow, 10.0, 55.8, 293.0), rise, 6e-3);
    }
}

#[test]
fn formula_air_limits_of_openings() {
    // R1 door 3.82 MW, 0.8 x 2.0 3.39, gap 0.13 x 2.0 0.55, window 1.2 x 1.1 2.08.
    let rows = [
        (0.9, 2.0, 3.82e6),
        (0.8, 2.0, 3.39e6),
        (0.13, 2.0, 0.55e6),
        (1.2, 1.1, 2.08e6),
    ];
    for (w, h, limit) in rows {
        close(air_limit(opening_factor(w, h)), limit, 4e-3);
    }
    close(wood_burning_rate(opening_factor(0.9, 2.0)), 0.233, 3e-3);
}

#[test]
fn formula_well_mixed_opening_400_to_1000_celsius() {
    let rows = [
        (400.0, 0.514, 0.431),
        (600.0, 0.517, 0.410),
        (800.0, 0.509, 0.394),
        (1000.0, 0.497, 0.380),
    ];
    for (celsius, flow, plane) in rows {
        let (m, n) = well_mixed_flow(1.0, 0.68, 353.0 / 293.15, 353.0 / (celsius + 273.15));
        close(m, flow, 2e-3);
        close(n, plane, 2e-3);
    }
    assert_eq!(well_mixed_flow(1.0, 0.68, 1.2, 1.2), (0.0, 0.5));
}

#[test]
fn formula_smoke_filling_two_rooms() {
    // 200 m2, 6 m, 1000 kW: first smoke (NFPA 92) and bulk (Yamana-Tanaka).
    let rows = [
        (30.0, 3.97, 4.29),
        (60.0, 2.81, 3.26),
        (90.0, 2.13, 2.59),
        (120.0, 1.64, 2.12),
    ];
    for (time, first, bulk) in rows {
        close(first_smoke_height(1e6, 200.0, 6.0, time), first, 4e-3);
        close(smoke_layer_height(1e6, 200.0, 6.0, time), bulk, 4e-3);
    }
    close(first_smoke_height(1e5, 12.0, 2.4, 30.0), 0.62, 0.01);
    close(smoke_layer_height(1e5, 12.0, 2.4, 30.0), 0.82, 0.01);
    close(smoke_layer_height(1e5, 12.0, 2.4, 60.0), 0.44, 0.015);
    assert_eq!(first_smoke_height(1e6, 200.0, 6.0, 0.0), 6.0);
    close(smoke_layer_height(1e6, 200.0, 6.0, 0.0), 6.0, 1e-12);
}

#[test]
fn formula_air_store_of_a_room() {
    close(air_store(1.2, 0.2095, 0.15, 13.1e6), 1.03e6, 6e-3);
    close(air_store(1.2, 0.2095, 0.13, 13.1e6), 1.38e6, 3e-3);
    assert_eq!(air_store(1.2, 0.15, 0.15, 13.1e6), 0.0);
}

#[test]
fn formula_t_squared_times_and_energies() {
    let rows = [
        (SLOW, 600.0, 26.0),
        (MEDIUM, 300.0, 106.0),
        (FAST, 150.0, 422.0),
        (ULTRA_FAST, 75.0, 1690.0),
    ];
    for (alpha, seconds, megajoules) in rows {
        close(t_squared(alpha, 1e9, seconds), 1055e3, 2e-3);
        close(time_of_cap(alpha, 1055e3), seconds, 1e-3);
        close(t_squared_energy(alpha, 1e12, 300.0), megajoules * 1e6, 0.02);
    }
    assert_eq!(t_squared(FAST, 300e3, 1e4), 300e3);
    assert_eq!(t_squared(FAST, 300e3, -1.0), 0.0);
    assert_eq!(time_of_cap(0.0, 1.0), f64::INFINITY);
    assert_eq!(time_of_cap(FAST, 0.0), 0.0);
    // Growth to the cap, then steady burning.
    let cap = time_of_cap(FAST, 300e3);
    let energy = t_squared_energy(FAST, 300e3, cap + 10.0);
    close(energy, 300e3 * cap / 3.0 + 3e6, 1e-12);
}

#[test]
fn formula_burn_out_rolls_off() {
    close(burn_out(10.0, 10.0, 0.3), 1.0, 3e-3);
    close(burn_out(3.0, 10.0, 0.3), 2.0_f64.powf(-0.25), 1e-12);
    close(burn_out(0.003, 10.0, 0.3), 0.001, 1e-9);
    assert_eq!(burn_out(0.0, 10.0, 0.3), 0.0);
    assert_eq!(burn_out(-1.0, 10.0, 0.3), 0.0);
    assert_eq!(burn_out(1.0, 10.0, 0.0), 1.0);
}
