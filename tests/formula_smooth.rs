//! The smooth steps, minima and caps against their definitions.

use doorglow::physics::smooth::{min8, smoothstep, soft_cap, softplus, window};

fn close(value: f64, expected: f64, relative: f64) {
    assert!(
        (value - expected).abs() <= relative * expected.abs(),
        "{value} against {expected}"
    );
}

#[test]
fn formula_smoothstep_is_the_cubic_between_zero_and_one() {
    assert_eq!(smoothstep(-1.0), 0.0);
    assert_eq!(smoothstep(0.0), 0.0);
    assert_eq!(smoothstep(0.5), 0.5);
    close(smoothstep(0.25), 0.15625, 1e-15);
    assert_eq!(smoothstep(2.0), 1.0);
    assert_eq!(window(500.0, 400.0, 600.0), 0.5);
    assert_eq!(window(1.0, 2.0, 2.0), 0.0);
    assert_eq!(window(2.0, 2.0, 2.0), 1.0);
}

#[test]
fn formula_min8_is_the_published_form_without_overflow() {
    for (a, b) in [(1.0_f64, 1.0_f64), (2.0, 1.0), (3.0, 3.5), (1e3, 1e5)] {
        let direct = a * b / (a.powi(8) + b.powi(8)).powf(0.125);
        close(min8(a, b), direct, 1e-14);
        close(min8(b, a), direct, 1e-14);
    }
    close(min8(1e200, 1e300), 1e200, 1e-15);
    close(min8(1e-200, 1e-300), 1e-300, 1e-15);
    assert_eq!(min8(0.0, 5.0), 0.0);
    assert_eq!(min8(0.0, 0.0), 0.0);
    assert_eq!(min8(-1.0, 5.0), 0.0);
    assert_eq!(min8(3.0, f64::INFINITY), 3.0);
}

#[test]
fn formula_softplus_and_soft_cap() {
    close(softplus(0.0, 2.0), 2.0 * std::f64::consts::LN_2, 1e-15);
    close(softplus(3.0, 2.0), 2.0 * 1.5_f64.exp().ln_1p(), 1e-14);
    close(softplus(1e6, 1.0), 1e6, 1e-15);
    assert_eq!(softplus(-1e6, 1.0), 0.0);
    assert_eq!(softplus(-3.0, 0.0), 0.0);
    for (x, cap) in [(1.0_f64, 3.0_f64), (2.0, 2.0), (10.0, 2.0)] {
        close(
            soft_cap(x, cap),
            x / (1.0 + (x / cap).powi(4)).powf(0.25),
            1e-14,
        );
    }
    close(soft_cap(1e200, 2.0), 2.0, 1e-12);
    assert_eq!(soft_cap(0.0, 2.0), 0.0);
    assert_eq!(soft_cap(1.0, 0.0), 0.0);
}
