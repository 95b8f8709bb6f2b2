//! Heating of panes, cracking, fall-out levels and hollow doors.

use doorglow::physics::enclosure::black;
use doorglow::physics::glass::{
    DENSITY, DOUBLE, EMISSIVITY, HEAT_CAPACITY, HOLLOW_DOOR_DELAY, HOLLOW_DOOR_TEMPERATURE,
    INSIDE_CONVECTION, OUTSIDE_CONVECTION, Pane, SINGLE_THICK, SINGLE_THIN, crack_rise,
    hollow_door_rate, pane_rate,
};

const OUTSIDE: f64 = 283.15;

fn pane(thickness: f64) -> Pane {
    Pane {
        thickness,
        density: DENSITY,
        heat_capacity: HEAT_CAPACITY,
        emissivity: EMISSIVITY,
    }
}

fn close(value: f64, expected: f64, allowed: f64) {
    assert!(
        (value - expected).abs() <= allowed,
        "{value} against {expected}, allowed {allowed}"
    );
}

#[test]
fn formula_pane_rests_at_one_temperature() {
    let t = 293.15;
    close(
        pane_rate(&pane(0.004), t, [t, t], 0.4, black(t), t),
        0.0,
        1e-12,
    );
    assert_eq!(pane_rate(&pane(0.0), t, [900.0, 900.0], 1.0, 9e4, t), 0.0);
}

#[test]
fn formula_pane_rate_by_hand() {
    // Cold pane between black surroundings of 500 °C and cold air of the same
    // temperature as the pane: all terms outward vanish.
    let hot = 773.15;
    let rate = pane_rate(
        &pane(0.003),
        OUTSIDE,
        [OUTSIDE, hot],
        0.5,
        black(hot),
        OUTSIDE,
    );
    let flux =
        INSIDE_CONVECTION * 0.5 * (hot - OUTSIDE) + EMISSIVITY * (black(hot) - black(OUTSIDE));
    close(rate, flux / (2500.0 * 840.0 * 0.003), 1e-9);
    // 2.94 kW/m2 by convection and 0.84 x (20.26 - 0.36) kW/m2 by radiation on
    // 6.3 kJ/m2/K.
    close(rate, 3.12, 0.01);
    // Thicker panes are slower in proportion; the share counts linearly.
    let thick = pane_rate(
        &pane(0.006),
        OUTSIDE,
        [OUTSIDE, hot],
        0.5,
        black(hot),
        OUTSIDE,
    );
    close(thick, 0.5 * rate, 1e-12);
    let at = |share| pane_rate(&pane(0.003), 350.0, [320.0, hot], share, 1e4, OUTSIDE);
    close(at(0.5), 0.5 * (at(0.0) + at(1.0)), 1e-12);
    close(at(2.0), at(1.0), 0.0);
}

#[test]
fn formula_pane_settles_between_room_and_open_air() {
    // Uniform black room at 400 °C: like fluxes both sides but for the
    // coefficients, so about the mean of the emissive powers.
    let hot = 673.15;
    let mut t = OUTSIDE;
    for _ in 0..40_000 {
        t += 0.05 * pane_rate(&pane(0.004), t, [hot, hot], 1.0, black(hot), OUTSIDE);
    }
    let gain = INSIDE_CONVECTION * (hot - t) + EMISSIVITY * (black(hot) - black(t));
    let loss = OUTSIDE_CONVECTION * (t - OUTSIDE) + EMISSIVITY * (black(t) - black(OUTSIDE));
    close(gain, loss, 1e-3 * gain);
    assert!(t > 500.0 && t < 620.0, "{t}");
}

#[test]
fn formula_crack_and_fall_out_levels() {
    close(crack_rise(40e6, 70e9, 9e-6), 63.0, 1.0);
    for (kind, celsius) in [(SINGLE_THIN, 350.0), (SINGLE_THICK, 450.0), (DOUBLE, 600.0)] {
        close(kind.gas_temperature - 273.15, celsius, 1e-9);
        assert!((60.0..=80.0).contains(&kind.crack_rise));
    }
    // A thin pane in a layer of 450 °C cracks within a minute.
    let hot = 723.15;
    let (mut t, mut time) = (OUTSIDE, 0.0);
    while t - OUTSIDE < SINGLE_THIN.crack_rise {
        t += 0.1
            * pane_rate(
                &pane(0.003),
                t,
                [OUTSIDE, hot],
                0.7,
                0.6 * black(hot),
                OUTSIDE,
            );
        time += 0.1;
    }
    assert!((15.0..60.0).contains(&time), "{time}");
}

#[test]
fn formula_hollow_door_stands_five_minutes_in_the_furnace() {
    let furnace = |s: f64| 273.15 + 20.0 + 345.0 * (8.0 * s / 60.0 + 1.0).log10();
    let used: f64 = (0..3000)
        .map(|i| 0.1 * hollow_door_rate(furnace(0.1 * (f64::from(i) + 0.5))))
        .sum();
    close(used, 1.0, 2e-3);
    close(
        HOLLOW_DOOR_DELAY * hollow_door_rate(HOLLOW_DOOR_TEMPERATURE),
        1.0,
        0.05,
    );
    close(1.0 / hollow_door_rate(873.15), 154.0, 1.0);
    assert_eq!(hollow_door_rate(500.0), 0.0);
}
