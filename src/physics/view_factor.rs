//! View factors of a rectangular room and of a point in it.

use std::f64::consts::PI;

/// View factor between two equal, aligned, parallel rectangles.
///
/// With `X = width/distance`, `Y = length/distance`:
///
/// ```text
/// F = 2/(pi X Y) { ln sqrt[(1+X^2)(1+Y^2)/(1+X^2+Y^2)]
///     + X sqrt(1+Y^2) atan(X/sqrt(1+Y^2)) + Y sqrt(1+X^2) atan(Y/sqrt(1+X^2))
///     - X atan X - Y atan Y }
/// ```
///
/// Exact; Siegel and Howell, from memory. All in m; the result lies between 0
/// and 1. Touching rectangles (`distance <= 0`) give 1, a rectangle without
/// area gives 0.
#[must_use]
pub fn parallel_rectangles(width: f64, length: f64, distance: f64) -> f64 {
    if width <= 0.0 || length <= 0.0 {
        return 0.0;
    }
    if distance <= 0.0 {
        return 1.0;
    }
    let x = width / distance;
    let y = length / distance;
    let along_x = (1.0 + x * x).sqrt();
    let along_y = (1.0 + y * y).sqrt();
    let both = (1.0 + x * x + y * y).sqrt();
    let sum = (along_x * along_y / both).ln()
        + x * along_y * (x / along_y).atan()
        + y * along_x * (y / along_x).atan()
        - x * x.atan()
        - y * y.atan();
    (2.0 * sum / (PI * x * y)).clamp(0.0, 1.0)
}

/// Share of all directions in which a point sees a rectangle `a` x `b` whose
/// centre lies straight ahead at `distance`: solid angle over 4 pi.
///
/// `(1/pi) atan( a b / (2 d sqrt(4 d^2 + a^2 + b^2)) )` (exact geometry). All
/// in m. At or below a distance of zero the point sees half of all directions
/// filled: 0.5. A rectangle without area gives 0.
#[must_use]
pub fn point_to_rectangle(a: f64, b: f64, distance: f64) -> f64 {
    if a <= 0.0 || b <= 0.0 {
        return 0.0;
    }
    if distance <= 0.0 {
        return 0.5;
    }
    let diagonal = (4.0 * distance * distance + a * a + b * b).sqrt();
    (a * b / (2.0 * distance * diagonal)).atan() / PI
}
