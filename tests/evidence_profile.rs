//! Form and thickness of the station profile, held against sixteen measured
//! thermocouple arrays: one room 3.66 x 3.66 x 2.44 m, gas burners, door open
//! or shut. Source: DOI 10.5281/zenodo.5703474 (MIT licence), means over the
//! repeated tests; open door: the last 60 s of burning, shut: the state at
//! flame-out. Degrees Celsius and metres.
//!
//! The layers of a measured array depend on their definition. Two published
//! ones are kept here: the integral ratio of He, Fernando and Luo 1998, near
//! which two-layer models lie and to which the thickness is fitted, and the
//! two integrals of Janssens and Tran 1992, whose interface lies 0.2-0.4 m
//! below the steep part of the open-door arrays.

#![allow(clippy::unwrap_used, clippy::print_stdout, clippy::unnecessary_wraps)]

use doorglow::exposure::profile::{between, upper_share};

/// Heights of the thermocouples, m.
const HEIGHTS: [f64; 8] = [0.34, 0.64, 0.94, 1.24, 1.54, 1.84, 2.14, 2.42];

/// One burner setting: upper, lower, interface by two definitions, and the
/// array.
struct Setting {
    name: &'static str,
    door_open: bool,
    integral_ratio: [f64; 3],
    two_integrals: [f64; 3],
    profile: [f64; 8],
}

const SETTINGS: [Setting; 16] = [
    Setting {
        name: "100 kW, 0.6 m burner, centre",
        door_open: true,
        integral_ratio: [136.5, 28.9, 1.380],
        two_integrals: [123.8, 24.3, 1.181],
        profile: [19.9, 23.0, 26.6, 43.7, 124.6, 139.7, 144.9, 159.9],
    },
    Setting {
        name: "100 kW, 0.3 m burner, centre",
        door_open: true,
        integral_ratio: [160.9, 35.8, 1.643],
        two_integrals: [132.5, 27.0, 1.293],
        profile: [20.8, 25.7, 31.4, 36.8, 75.1, 156.4, 170.8, 185.2],
    },
    Setting {
        name: "250 kW, 0.6 m burner, centre",
        door_open: true,
        integral_ratio: [250.2, 48.7, 1.377],
        two_integrals: [219.9, 39.3, 1.127],
        profile: [29.6, 38.5, 49.9, 74.9, 222.1, 256.3, 268.5, 300.7],
    },
    Setting {
        name: "500 kW, 0.6 m burner, centre",
        door_open: true,
        integral_ratio: [395.7, 100.1, 1.367],
        two_integrals: [338.9, 80.4, 1.027],
        profile: [62.1, 84.8, 110.4, 155.2, 337.4, 400.8, 425.8, 505.1],
    },
    Setting {
        name: "100 kW, 0.6 m burner, corner",
        door_open: true,
        integral_ratio: [145.6, 29.8, 1.478],
        two_integrals: [129.7, 24.1, 1.254],
        profile: [19.7, 23.9, 28.9, 34.4, 104.1, 147.4, 164.6, 179.2],
    },
    Setting {
        name: "100 kW, 0.3 m burner, corner",
        door_open: true,
        integral_ratio: [145.3, 28.3, 1.478],
        two_integrals: [128.9, 22.6, 1.250],
        profile: [18.3, 22.8, 27.8, 32.9, 98.9, 147.5, 165.9, 179.7],
    },
    Setting {
        name: "250 kW, 0.6 m burner, corner",
        door_open: true,
        integral_ratio: [252.7, 49.0, 1.465],
        two_integrals: [217.0, 38.4, 1.184],
        profile: [28.9, 40.2, 49.7, 64.2, 174.4, 257.1, 292.5, 319.5],
    },
    Setting {
        name: "500 kW, 0.6 m burner, corner",
        door_open: true,
        integral_ratio: [421.8, 118.6, 1.500],
        two_integrals: [343.3, 89.1, 1.036],
        profile: [72.5, 114.2, 142.7, 171.5, 284.8, 419.6, 487.9, 558.5],
    },
    Setting {
        name: "100 kW, 0.6 m burner, centre",
        door_open: false,
        integral_ratio: [200.4, 87.7, 0.563],
        two_integrals: [201.0, 88.8, 0.579],
        profile: [78.8, 139.2, 175.6, 194.1, 205.5, 215.2, 226.7, 263.2],
    },
    Setting {
        name: "100 kW, 0.3 m burner, centre",
        door_open: false,
        integral_ratio: [178.0, 85.2, 0.708],
        two_integrals: [175.8, 82.3, 0.646],
        profile: [73.2, 110.7, 145.3, 167.1, 181.0, 188.1, 201.5, 228.1],
    },
    Setting {
        name: "250 kW, 0.6 m burner, centre",
        door_open: false,
        integral_ratio: [200.4, 92.7, 0.560],
        two_integrals: [200.7, 93.1, 0.567],
        profile: [84.3, 143.0, 180.0, 197.1, 206.2, 214.9, 222.6, 252.7],
    },
    Setting {
        name: "500 kW, 0.6 m burner, centre",
        door_open: false,
        integral_ratio: [198.7, 100.7, 0.583],
        two_integrals: [198.6, 100.7, 0.582],
        profile: [92.4, 144.5, 178.4, 194.4, 204.6, 212.0, 218.4, 246.0],
    },
    Setting {
        name: "100 kW, 0.6 m burner, corner",
        door_open: false,
        integral_ratio: [195.4, 80.0, 0.600],
        two_integrals: [195.7, 80.3, 0.606],
        profile: [69.6, 125.1, 163.9, 185.4, 202.2, 215.0, 232.2, 267.7],
    },
    Setting {
        name: "100 kW, 0.3 m burner, corner",
        door_open: false,
        integral_ratio: [161.0, 84.7, 0.727],
        two_integrals: [159.0, 82.1, 0.657],
        profile: [74.3, 105.4, 132.9, 150.2, 162.4, 172.4, 184.5, 206.2],
    },
    Setting {
        name: "250 kW, 0.6 m burner, corner",
        door_open: false,
        integral_ratio: [268.6, 96.0, 0.588],
        two_integrals: [269.7, 97.5, 0.605],
        profile: [81.0, 163.5, 218.5, 252.8, 278.0, 298.8, 331.6, 405.7],
    },
    Setting {
        name: "500 kW, 0.6 m burner, corner",
        door_open: false,
        integral_ratio: [238.7, 130.2, 0.605],
        two_integrals: [238.7, 130.2, 0.605],
        profile: [120.9, 175.1, 213.1, 230.7, 247.1, 256.7, 269.1, 309.4],
    },
];

/// Root mean square difference of profile and array, K.
fn difference(layers: [f64; 3], profile: &[f64; 8], thickness: f64) -> f64 {
    let [upper, lower, interface] = layers;
    let squares: f64 = HEIGHTS
        .iter()
        .zip(profile)
        .map(|(&height, &measured)| {
            let share = upper_share(height, interface, thickness);
            (between(lower, upper, share) - measured).powi(2)
        })
        .sum();
    (squares / HEIGHTS.len() as f64).sqrt()
}

/// Root mean square over the settings that `choose` takes, K.
fn overall(choose: impl Fn(&Setting) -> Option<[f64; 3]>, thickness: f64) -> f64 {
    let squares: Vec<f64> = SETTINGS
        .iter()
        .filter_map(|setting| {
            Some(difference(choose(setting)?, &setting.profile, thickness).powi(2))
        })
        .collect();
    (squares.iter().sum::<f64>() / squares.len() as f64).sqrt()
}

/// Thickness of the least value, m, on a grid of 1 cm.
fn thickness_of_least(value: impl Fn(f64) -> f64) -> f64 {
    (5..=150)
        .map(|centimetres| f64::from(centimetres) / 100.0)
        .min_by(|&a, &b| value(a).total_cmp(&value(b)))
        .unwrap()
}

fn all(setting: &Setting) -> Option<[f64; 3]> {
    Some(setting.integral_ratio)
}

fn open(setting: &Setting) -> Option<[f64; 3]> {
    setting.door_open.then_some(setting.integral_ratio)
}

fn shut(setting: &Setting) -> Option<[f64; 3]> {
    (!setting.door_open).then_some(setting.integral_ratio)
}

#[test]
fn evidence_profile_thickness_is_about_half_a_metre() {
    let report = |name: &str, choose: fn(&Setting) -> Option<[f64; 3]>| {
        let best = thickness_of_least(|thickness| overall(choose, thickness));
        let [step, least, used] = [0.0, best, 0.5].map(|thickness| overall(choose, thickness));
        println!(
            "{name}: step {step:.1} K, best {least:.1} K at {best:.2} m, at 0.5 m {used:.1} K"
        );
        [best, step, least, used]
    };
    let [best, step, least, used] = report("all", all);
    assert!((best - 0.5).abs() < 0.1, "best thickness {best} m");
    assert!(
        used < 1.01 * least,
        "the minimum is flat: {used} against {least} K"
    );
    assert!(used < 0.83 * step, "{used} K against {step} K for the step");
    let [best_open, ..] = report("door open", open);
    let [best_shut, ..] = report("door shut", shut);
    assert!((0.35..0.45).contains(&best_open), "{best_open} m");
    assert!((0.5..0.6).contains(&best_shut), "{best_shut} m");
}

#[test]
fn evidence_profile_is_nearer_than_the_step_in_every_setting() {
    for setting in &SETTINGS {
        let step = difference(setting.integral_ratio, &setting.profile, 0.0);
        let used = difference(setting.integral_ratio, &setting.profile, 0.5);
        assert!(used < step, "{}: {used} K against {step} K", setting.name);
    }
}

#[test]
fn evidence_profile_with_the_other_layer_definition_is_nearer_than_the_step_too() {
    let other = |setting: &Setting| Some(setting.two_integrals);
    let best = thickness_of_least(|thickness| overall(other, thickness));
    assert!((0.5..0.8).contains(&best), "{best} m");
    assert!(overall(other, 0.5) < 0.92 * overall(other, 0.0));
}
