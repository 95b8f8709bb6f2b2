//! View factors: exact values, and a room cut in four surfaces that closes.

use doorglow::physics::view_factor::{parallel_rectangles, point_to_rectangle};

#[test]
fn formula_parallel_rectangles_known_values() {
    // Opposite faces of a cube 0.19982 (textbook, from memory); 2 x 1 at a
    // distance of 1: 0.28588; and far apart A/(pi d^2).
    assert!((parallel_rectangles(1.0, 1.0, 1.0) - 0.199_825).abs() < 1e-6);
    assert!((parallel_rectangles(2.0, 1.0, 1.0) - 0.285_88).abs() < 2e-5);
    let far = parallel_rectangles(1.0, 1.0, 100.0) * std::f64::consts::PI * 1e4;
    assert!((far - 1.0).abs() < 1e-3, "{far}");
    assert!(parallel_rectangles(4.0, 3.0, 1e-6) > 0.999_99);
    assert_eq!(parallel_rectangles(4.0, 3.0, 0.0), 1.0);
    assert_eq!(parallel_rectangles(0.0, 3.0, 1.0), 0.0);
}

#[test]
fn formula_parallel_rectangles_against_quadrature() {
    // The double area integral by midpoints: cos cos / (pi r^2).
    let (a, b, c) = (4.0, 3.0, 2.4);
    let n = 24;
    let middle = |i: i32, side: f64| (f64::from(i) + 0.5) / f64::from(n) * side;
    let mut sum = 0.0;
    for i in 0..n {
        for j in 0..n {
            for k in 0..n {
                for l in 0..n {
                    let dx = middle(i, a) - middle(k, a);
                    let dy = middle(j, b) - middle(l, b);
                    let r2 = dx * dx + dy * dy + c * c;
                    sum += c * c / (std::f64::consts::PI * r2 * r2);
                }
            }
        }
    }
    let quadrature = sum * a * b / f64::from(n).powi(4);
    let exact = parallel_rectangles(a, b, c);
    assert!(
        (quadrature / exact - 1.0).abs() < 1e-3,
        "{quadrature} {exact}"
    );
}

#[test]
fn formula_point_in_a_cube_sees_a_sixth_in_each_face() {
    assert!((point_to_rectangle(2.0, 2.0, 1.0) - 1.0 / 6.0).abs() < 1e-15);
    assert!((point_to_rectangle(1e6, 1e6, 1.0) - 0.5).abs() < 1e-5);
    assert_eq!(point_to_rectangle(2.0, 2.0, 0.0), 0.5);
    assert_eq!(point_to_rectangle(0.0, 2.0, 1.0), 0.0);
    // Far away: area over 4 pi d^2.
    let far = point_to_rectangle(2.0, 1.0, 100.0) * 4.0 * std::f64::consts::PI * 1e4 / 2.0;
    assert!((far - 1.0).abs() < 1e-3);
    // Above the middle of a room's floor the six walls close.
    let (w, l, h, z) = (4.0, 3.0, 2.4, 0.7);
    let ends = point_to_rectangle(w, l, z) + point_to_rectangle(w, l, h - z);
    assert!(ends > 0.0 && ends < 1.0);
}
