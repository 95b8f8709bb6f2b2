//! Stations: view factor against published limits and a numerical integral,
//! layer radiation against black-body values, visibility, bounds of the
//! profile, and the columns as a whole.

mod support;

use doorglow::exposure::flux::{from_layer, view_factor_below};
use doorglow::exposure::observe;
use doorglow::exposure::profile::{between, fitting_thickness, upper_share};
use doorglow::record::{Quantity, Subject};
use proptest::prelude::*;

/// The view factor integrated over the rectangle, midpoint rule.
fn integrated(width: f64, length: f64, drop: f64) -> f64 {
    let parts = 400;
    let (dx, dy) = (width / f64::from(parts), length / f64::from(parts));
    let mut sum = 0.0;
    for i in 0..parts {
        for j in 0..parts {
            let x = (f64::from(i) + 0.5) * dx - width / 2.0;
            let y = (f64::from(j) + 0.5) * dy - length / 2.0;
            let squared = x * x + y * y + drop * drop;
            sum += drop * drop / (std::f64::consts::PI * squared * squared) * dx * dy;
        }
    }
    sum
}

#[test]
fn formula_view_factor_is_the_integral_over_the_rectangle() {
    for (width, length, drop) in [(4.0, 3.2, 1.0), (6.0, 1.2, 0.5), (2.0, 2.0, 3.0)] {
        let exact = view_factor_below(width, length, drop);
        let sum = integrated(width, length, drop);
        assert!((exact - sum).abs() < 2e-4, "{exact} against {sum}");
    }
}

#[test]
fn formula_view_factor_limits() {
    assert_eq!(view_factor_below(4.0, 3.2, 0.0), 1.0);
    assert_eq!(view_factor_below(4.0, 3.2, -0.3), 1.0);
    assert!((view_factor_below(4.0, 3.2, 1e-4) - 1.0).abs() < 1e-6);
    // A small far rectangle: area over pi times distance squared.
    let far = view_factor_below(0.1, 0.2, 10.0);
    assert!((far / (0.02 / (std::f64::consts::PI * 100.0)) - 1.0).abs() < 1e-3);
}

#[test]
fn formula_layer_radiation_is_that_of_a_black_body() {
    // Black layer of 600 °C: 32.5 kW/m2 above a surface at 20 °C, by sigma T^4.
    let surroundings = from_layer(1.0, 293.15, 293.15);
    let net = from_layer(1.0, 873.15, 300.0) - surroundings;
    assert!((net / 32.5e3 - 1.0).abs() < 2e-3, "{net}");
    assert!((from_layer(0.0, 873.15, 293.15) - surroundings).abs() < 1e-9);
}

#[test]
fn formula_profile_slope_at_the_interface_bridges_the_layers_over_the_thickness() {
    let step = 1e-5;
    let slope =
        (upper_share(1.0 + step, 1.0, 0.5) - upper_share(1.0 - step, 1.0, 0.5)) / (2.0 * step);
    assert!((slope - 2.0).abs() < 1e-6, "{slope} per metre");
    assert!((upper_share(1.0, 1.0, 0.5) - 0.5).abs() < 1e-12);
}

#[test]
fn verify_a_vanished_layer_does_not_colour_the_gas_at_the_head() {
    let thickness = fitting_thickness(0.5, 0.005, 2.4);
    assert!(upper_share(0.3, 0.005, thickness) > 0.999_999);
    let thickness = fitting_thickness(0.5, 2.395, 2.4);
    assert!(upper_share(1.7, 2.395, thickness) < 1e-6);
    assert_eq!(fitting_thickness(0.5, 1.0, 2.4), 0.5);
}

proptest! {
    #[test]
    fn verify_profile_stays_between_the_layers_and_rises(
        lower in 250.0..900.0_f64, rise in 0.0..1200.0_f64,
        height in -0.5..3.5_f64, more in 0.0..1.0_f64,
        interface in 0.0..3.0_f64, thickness in 0.0..2.0_f64,
    ) {
        let upper = lower + rise;
        let here = between(lower, upper, upper_share(height, interface, thickness));
        let above = between(lower, upper, upper_share(height + more, interface, thickness));
        prop_assert!((lower..=upper).contains(&here));
        prop_assert!(above >= here - 1e-9);
    }

    #[test]
    fn verify_view_factor_falls_with_distance(
        width in 0.1..20.0_f64, length in 0.1..20.0_f64,
        drop in 0.0..10.0_f64, more in 0.0..2.0_f64,
    ) {
        let near = view_factor_below(width, length, drop);
        let far = view_factor_below(width, length, drop + more);
        prop_assert!((0.0..=1.0 + 1e-12).contains(&near) && far <= near + 1e-12);
    }
}

#[test]
fn verify_stations_get_six_columns_once() {
    let (plan, mut record) = support::starved_and_back();
    observe(&mut record, &plan);
    observe(&mut record, &plan);
    let crew = Subject::Station(0);
    let columns = record.columns.iter().filter(|c| c.subject == crew).count();
    assert_eq!(columns, 6);
    let temperature = record.get(crew, Quantity::StationTemperature);
    assert_eq!(temperature.len(), record.time.len());
    let lower = record.get(Subject::Room(1), Quantity::LowerTemperature);
    let upper = record.get(Subject::Room(1), Quantity::UpperTemperature);
    for ((t, lower), upper) in temperature.iter().zip(lower).zip(upper) {
        assert!(t >= lower && t <= upper);
    }
}

#[test]
fn verify_stations_of_a_record_without_columns_are_not_a_number() {
    let (plan, mut record) = support::starved_and_back();
    record.columns.clear();
    observe(&mut record, &plan);
    let temperature = record.get(Subject::Station(0), Quantity::StationTemperature);
    assert_eq!(temperature.len(), record.time.len());
    assert!(temperature.iter().all(|t| t.is_nan()));
}
