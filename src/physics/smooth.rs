//! Smooth replacements for switches, minima and caps, so that the derivative
//! of the state has no jumps for the step controller to stumble over.

/// Smooth step `3 s^2 - 2 s^3` with `s = x` held between 0 and 1.
///
/// `x` is dimensionless; the result runs from 0 (`x <= 0`) to 1 (`x >= 1`)
/// with zero slope at both ends. Not a number stays not a number.
#[must_use]
pub fn smoothstep(x: f64) -> f64 {
    let s = x.clamp(0.0, 1.0);
    s * s * (3.0 - 2.0 * s)
}

/// Smooth step of `x` between `start` (0) and `full` (1), all in one unit.
///
/// Where `full <= start` it is the sharp step at `start`.
#[must_use]
pub fn window(x: f64, start: f64, full: f64) -> f64 {
    if full > start {
        smoothstep((x - start) / (full - start))
    } else if x >= start {
        1.0
    } else {
        0.0
    }
}

/// Soft minimum `a b / (a^8 + b^8)^(1/8)` of two amounts of one unit.
///
/// Never above the smaller of the two; 8.3 % below it where they are equal,
/// 0.05 % where one is twice the other. For `a, b >= 0`; zero if either is
/// zero or below. Written as `min (1 + r^8)^(-1/8)`, `r = min/max`, which
/// cannot overflow and needs no power function.
#[must_use]
pub fn min8(a: f64, b: f64) -> f64 {
    let low = a.min(b);
    if low <= 0.0 {
        return 0.0;
    }
    let high = a.max(b);
    if high.is_infinite() {
        return low;
    }
    let r2 = (low / high) * (low / high);
    let r4 = r2 * r2;
    low / (1.0 + r4 * r4).sqrt().sqrt().sqrt()
}

/// Soft positive part `w ln(1 + exp(x/w))`, in the unit of `x`.
///
/// Approaches `x` for `x >> w` and 0 for `x << -w`; `w ln 2` at zero. For a
/// `width` of zero or below it is the sharp `max(x, 0)`. Cannot overflow.
#[must_use]
pub fn softplus(x: f64, width: f64) -> f64 {
    if width <= 0.0 {
        return x.max(0.0);
    }
    x.max(0.0) + width * (-x.abs() / width).exp().ln_1p()
}

/// Soft cap `x / (1 + (x/cap)^4)^(1/4)`, in the unit of `x`.
///
/// Follows `x` well below `cap` (0.4 % low at a third of it) and approaches
/// `cap` from below. For `x >= 0`; below zero it is `x` itself. A `cap` of
/// zero or below gives zero.
#[must_use]
pub fn soft_cap(x: f64, cap: f64) -> f64 {
    if x <= 0.0 {
        return x;
    }
    if cap <= 0.0 {
        return 0.0;
    }
    let high = x.max(cap);
    let a = x / high;
    let b = cap / high;
    let a4 = (a * a) * (a * a);
    let b4 = (b * b) * (b * b);
    high * a * b / (a4 + b4).sqrt().sqrt()
}
