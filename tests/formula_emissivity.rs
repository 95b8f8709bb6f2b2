//! Layer emissivity: grey-gas sums (Smith, Shen, Friedman 1982) against total
//! emissivities after Leckner 1972, soot and physical bounds.
//!
//! Rows printed by tests/reference/emissivity.py; both sets of coefficients
//! are from memory and independent of one another.

use doorglow::physics::emissivity::{
    gas_emissivity, layer_emissivity, mean_beam_length, soot_absorption,
};

/// Temperature K, partial pressure of CO2 and H2O in atm, path m, emissivity.
const LECKNER: [(f64, f64, f64, f64, f64); 20] = [
    (400.0, 0.08, 0.16, 0.5, 0.251),
    (400.0, 0.08, 0.16, 2.0, 0.367),
    (400.0, 0.10, 0.10, 2.0, 0.333),
    (400.0, 0.03, 0.03, 2.0, 0.229),
    (600.0, 0.08, 0.16, 0.5, 0.248),
    (600.0, 0.08, 0.16, 2.0, 0.375),
    (600.0, 0.10, 0.10, 0.5, 0.216),
    (600.0, 0.03, 0.03, 2.0, 0.224),
    (900.0, 0.08, 0.16, 0.5, 0.226),
    (900.0, 0.08, 0.16, 2.0, 0.365),
    (900.0, 0.10, 0.10, 0.5, 0.197),
    (900.0, 0.10, 0.10, 2.0, 0.322),
    (900.0, 0.03, 0.03, 0.5, 0.113),
    (900.0, 0.03, 0.03, 2.0, 0.207),
    (1200.0, 0.08, 0.16, 2.0, 0.332),
    (1200.0, 0.10, 0.10, 0.5, 0.169),
    (1200.0, 0.10, 0.10, 2.0, 0.290),
    (1500.0, 0.08, 0.16, 2.0, 0.288),
    (1500.0, 0.10, 0.10, 2.0, 0.250),
    (1500.0, 0.03, 0.03, 2.0, 0.148),
];

#[test]
fn formula_gas_emissivity_against_leckner() {
    for (t, dioxide, water, length, expected) in LECKNER {
        let value = gas_emissivity(t, dioxide, water, length);
        // Below its fit (600 K) the sum runs up to a sixth high.
        let allowed = if t < 500.0 { 0.17 } else { 0.10 };
        assert!(
            (value / expected - 1.0).abs() < allowed,
            "{t} K, {dioxide}, {water}, {length} m: {value} against {expected}"
        );
    }
}

#[test]
fn formula_gas_emissivity_single_gases_at_1000_k() {
    // Hottel's charts at 1000 K and 1 atm m, dilute: water about 0.36, carbon
    // dioxide about 0.17 to 0.19 (from memory).
    let water = gas_emissivity(1000.0, 0.0, 0.5, 2.0);
    let dioxide = gas_emissivity(1000.0, 0.5, 0.0, 2.0);
    assert!((water - 0.36).abs() < 0.02, "{water}");
    assert!((dioxide - 0.18).abs() < 0.02, "{dioxide}");
}

#[test]
fn formula_gas_emissivity_keeps_physical_bounds() {
    assert_eq!(gas_emissivity(800.0, 0.0, 0.0, 2.0), 0.0);
    assert_eq!(gas_emissivity(800.0, 0.1, 0.1, 0.0), 0.0);
    for t in [250.0, 300.0, 600.0, 1200.0, 2400.0, 4000.0] {
        for (c, w) in [(0.1, 0.0), (0.1, 0.05), (0.1, 0.1), (0.1, 0.2), (0.0, 0.1)] {
            let mut last = 0.0;
            for step in 1..60 {
                let value = gas_emissivity(t, c, w, 0.2 * f64::from(step));
                assert!(value >= last && value < 1.0, "{t} {c} {w}: {value}");
                last = value;
            }
        }
    }
    // No jump where the tables meet.
    for share in [0.5, 2.0 / 3.0] {
        let at = |s: f64| gas_emissivity(900.0, 0.2 * (1.0 - s), 0.2 * s, 1.5);
        assert!((at(share - 1e-9) - at(share + 1e-9)).abs() < 1e-7);
    }
}

#[test]
fn formula_soot_absorption_and_layer() {
    // 0.72 m2/g at 1000 K: 1300 / 1800 kg/m3 x 1000 K.
    assert!((soot_absorption(1000.0, 1e-3) - 0.722).abs() < 0.001);
    assert_eq!(soot_absorption(1000.0, -1.0), 0.0);
    let clear = gas_emissivity(900.0, 0.08, 0.10, 1.8);
    let same = layer_emissivity(900.0, 0.08, 0.10, 0.0, 1.8, 1.0);
    assert!((clear - same).abs() < 1e-15);
    let only_soot = layer_emissivity(900.0, 0.0, 0.0, 1e-3, 1.8, 1.0);
    assert!((only_soot - (1.0 - (-0.65_f64 * 1.8).exp())).abs() < 1e-12);
    let both = layer_emissivity(900.0, 0.08, 0.10, 1e-3, 1.8, 1.0);
    assert!((1.0 - both - (1.0 - clear) * (1.0 - only_soot)).abs() < 1e-14);
    // A cube has V/A = a/6: 0.6 a.
    assert!((mean_beam_length(8.0, 24.0) - 1.2).abs() < 1e-15);
    assert_eq!(mean_beam_length(0.0, 24.0), 0.0);
}
