//! Flame out of an opening.

/// Height of a flame above the head of the opening it comes out of, m:
/// `1.9 (Q/w)^(2/3) - h`, Q in MW; never negative.
///
/// `release` in W, `width` w and `height` h of the opening in m. Form of EN
/// 1991-1-2 annex B without through draught (from memory), where Q is the
/// whole release of a room at full burning: fed with only what burns outside,
/// it gives the lower bound. Range: rooms short of air with flames already
/// outside, openings of 0.5 to 3 m, calm air. Zero for an opening without
/// width.
#[must_use]
pub fn height_above_head(release: f64, width: f64, height: f64) -> f64 {
    if !(release > 0.0 && width > 0.0) {
        return 0.0;
    }
    let per_width = release / 1e6 / width;
    (1.9 * (per_width * per_width).cbrt() - height).max(0.0)
}
