//! Fan curves and working points; mixing of layers by momentum.

use doorglow::physics::fan::{FanFlow, area_in_series, curve, working_point};
use doorglow::physics::leakage::{orifice, orifice_difference};
use doorglow::physics::mixing::{Entering, exchange_rate, mixed_share, richardson, stirring_speed};

fn close(value: f64, expected: f64, allowed: f64) {
    assert!(
        (value - expected).abs() <= allowed,
        "{value} against {expected}, allowed {allowed}"
    );
}

#[test]
fn formula_two_openings_in_series() {
    // 3.5 m3/s through 1.8 m2: 5.9 Pa; through two of them 11.8 Pa.
    close(orifice_difference(3.5, 1.8, 0.62, 1.2), 5.9, 0.02 * 5.9);
    let both = area_in_series(&[1.8, 1.8]);
    close(orifice_difference(3.5, both, 0.62, 1.2), 11.8, 0.02 * 11.8);
    for (pressure, flow) in [(5.0, 1.8), (10.0, 2.5), (20.0, 3.6), (25.0, 4.0)] {
        close(orifice(pressure, 1.0, 0.62, 1.2), flow, 0.02 * flow);
    }
    assert_eq!(area_in_series(&[1.8, 0.0]), 0.0);
    close(area_in_series(&[0.7]), 0.7, 1e-12);
    // Hatch 1.0 m2 behind window and doors of the flat: the smallest counts.
    assert!(area_in_series(&[2.8, 1.9, 1.8, 1.8, 1.0]) < 0.71);
}

#[test]
fn formula_fan_curve_is_straight_and_ends_smoothly() {
    let at = |rise| curve(5.0, 40.0, rise);
    close(at(0.0).flow, 5.0, 1e-12);
    close(at(20.0).flow, 2.5, 1e-12);
    close(at(-8.0).flow, 6.0, 1e-12);
    close(at(38.0).flow, 0.25, 1e-12);
    assert_eq!(at(42.0), FanFlow::default());
    assert_eq!(at(1e4), FanFlow::default());
    assert_eq!(curve(0.0, 40.0, 3.0), FanFlow::default());
    assert_eq!(curve(5.0, 0.0, 0.0), FanFlow::default());
    let mut before = at(30.0);
    for i in 1..1500 {
        let here = at(30.0 + 0.01 * f64::from(i));
        let fall = before.flow - here.flow;
        assert!(fall >= 0.0 && here.flow >= 0.0);
        close(fall, 0.005 * (before.slope + here.slope), 2e-5);
        before = here;
    }
}

#[test]
fn formula_working_point_of_fan_and_openings() {
    let both = area_in_series(&[1.8, 1.8]);
    let (flow, pressure) = working_point(5.0, 40.0, both, 0.62, 1.2, 0.0);
    // Worked by hand: 0.1204 Q^2 + Q - 5 = 0.
    close(flow, 3.51, 0.01);
    close(pressure, 11.9, 0.05);
    close(curve(5.0, 40.0, pressure).flow, flow, 1e-9);
    let (one, low) = working_point(5.0, 40.0, 1.8, 0.62, 1.2, 0.0);
    close(one, 4.02, 0.01);
    close(low, 7.80, 0.02);
    // 4 m/s straight on the outlet window (6.7 Pa).
    let (less, more) = working_point(5.0, 40.0, both, 0.62, 1.2, 6.72);
    close(orifice_difference(less, both, 0.62, 1.2), more - 6.72, 1e-9);
    close(curve(5.0, 40.0, more).flow, less, 1e-9);
    close(less, 3.04, 0.02);
    assert!(more > pressure);
    assert_eq!(working_point(5.0, 40.0, both, 0.62, 1.2, 45.0), (0.0, 40.0));
    assert_eq!(working_point(5.0, 40.0, 0.0, 0.62, 1.2, 0.0), (0.0, 40.0));
    assert_eq!(working_point(5.0, 0.0, 1.0, 0.62, 1.2, 0.0), (0.0, 0.0));
}

/// Density of air at a temperature in °C, kg/m3.
fn air(celsius: f64) -> f64 {
    353.0 / (celsius + 273.15)
}

#[test]
fn formula_richardson_by_hand() {
    // 20 and 400 °C: drho over the mean 0.786; 2.5 m, 2 m/s.
    close(richardson(air(20.0), air(400.0), 2.5, 2.0), 4.82, 0.03);
    assert_eq!(richardson(1.2, 1.2, 2.5, 1.0), 0.0);
    assert!(richardson(1.0, 1.2, 2.5, 1.0) < 0.0);
    assert!(richardson(1.2, 0.6, 2.5, 0.0).is_infinite());
    assert!(richardson(1.2, 1.2, 2.5, 0.0).is_infinite());
}

#[test]
fn formula_mixed_share_between_its_bounds() {
    assert_eq!(mixed_share(f64::INFINITY), 0.0);
    assert_eq!(mixed_share(1.25), 0.0);
    close(mixed_share(0.4756), 0.5, 1e-3);
    close(mixed_share(0.25), 1.0, 1e-12);
    assert_eq!(mixed_share(0.0), 1.0);
    assert_eq!(mixed_share(-3.0), 1.0);
    assert_eq!(mixed_share(f64::NAN), 0.0);
    // Newman's Froude 0.9 is where layers begin to blur.
    assert!(mixed_share(1.0 / (0.89 * 0.89)) == 0.0);
    assert!(mixed_share(1.0 / (0.95 * 0.95)) > 0.0);
    let mut before = 1.0;
    for i in 0..2000 {
        let here = mixed_share(1e-3 * f64::from(i));
        assert!(here <= before && before - here < 4e-3);
        before = here;
    }
}

#[test]
fn formula_stirring_speed_of_jets_and_through_flow() {
    let mut entering = Entering::default();
    entering.add(-3.0, 1.0);
    assert_eq!((entering.flow(), entering.speed_squared()), (0.0, 0.0));
    entering.add(4.0, 2.0);
    entering.add(1.0, 1.0);
    close(entering.flow(), 5.0, 1e-12);
    close(entering.speed_squared(), (4.0 * 4.0 + 1.0) / 5.0, 1e-12);
    // An opening as wide as the room.
    close(stirring_speed(6.0, 3.0, 4.0), 2.0, 1e-12);
    // A small jet into a large room: twice its speed.
    close(stirring_speed(0.01, 10.0, 9.0), 6.0, 1e-5);
    assert_eq!(stirring_speed(0.0, 0.0, 0.0), 0.0);
}

#[test]
fn formula_windy_corridor_is_mixed_and_a_draughty_one_is_not() {
    // 1.5 x 2.5 m corridor, 4 kg/s at 400 °C through a 1.8 m2 door.
    let share = |mass: f64, celsius: f64| {
        let flow = mass / air(celsius);
        let mut entering = Entering::default();
        entering.add(flow, 1.8);
        let speed = stirring_speed(entering.flow(), 3.75, entering.speed_squared());
        mixed_share(richardson(air(20.0), air(celsius), 2.5, speed))
    };
    assert!(share(4.0, 400.0) > 0.8, "{}", share(4.0, 400.0));
    assert!(share(5.0, 400.0) > 0.99);
    assert!(share(1.0, 400.0) == 0.0);
}

#[test]
fn formula_mixed_room_levels_within_a_flow_through() {
    let (volume, through) = (56.0, 4.0);
    let turnover = volume / through;
    let exchange = exchange_rate(0.5 * volume, 1.0, turnover);
    close(exchange, 4.0 * through, 1e-9);
    // Difference of two halves over one flow-through.
    let left = (-exchange * turnover * 4.0 / volume).exp();
    assert!(left < 0.01);
    // A cold stream into one half leaves it at four fifths of the other's rise,
    // within 15 % of the mean.
    let cool = exchange / (exchange + through);
    close(cool, 0.8, 1e-9);
    assert!(cool / (0.5 * (1.0 + cool)) > 0.85);
    for none in [
        exchange_rate(28.0, 0.0, 14.0),
        exchange_rate(0.0, 1.0, 14.0),
        exchange_rate(28.0, 1.0, f64::INFINITY),
        exchange_rate(28.0, 1.0, 0.0),
        exchange_rate(28.0, 1.0, f64::NAN),
    ] {
        assert_eq!(none, 0.0);
    }
}
