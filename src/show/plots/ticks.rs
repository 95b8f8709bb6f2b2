//! Round numbers for axes.

/// The round step (1, 2 or 5 times a power of ten) that cuts `span` into about
/// `count` parts.
pub fn round_step(span: f64, count: f64) -> f64 {
    let raw = span / count.max(1.0);
    if !(raw.is_finite() && raw > 0.0) {
        return 1.0;
    }
    let power = 10f64.powf(raw.log10().floor());
    let lead = raw / power;
    let round = if lead <= 1.0 {
        1.0
    } else if lead <= 2.0 {
        2.0
    } else if lead <= 5.0 {
        5.0
    } else {
        10.0
    };
    round * power
}

/// Ticks from `low` to `high` at multiples of `step`, at most 60.
pub fn ticks(low: f64, high: f64, step: f64) -> Vec<f64> {
    let first = (low / step - 1e-9).ceil();
    (0..60)
        .map(|k| (first + f64::from(k)) * step)
        .take_while(|tick| *tick <= high + step * 1e-9)
        .collect()
}

/// A tick's number with the decimals its step needs.
pub fn tick_text(tick: f64, step: f64) -> String {
    let decimals = (0..6)
        .find(|d| {
            let scaled = step * 10f64.powi(*d);
            (scaled - scaled.round()).abs() < 1e-6 * scaled
        })
        .unwrap_or(6);
    format!("{:.*}", usize::try_from(decimals).unwrap_or(0), tick + 0.0)
}

/// Unit of the time axis: minutes, or seconds for a short run.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct TimeUnit {
    /// As written.
    pub name: &'static str,
    /// Seconds in one.
    pub seconds: f64,
}

impl TimeUnit {
    /// Fitting for an axis that ends at `end` seconds.
    pub fn for_end(end: f64) -> Self {
        if end > 180.0 {
            Self {
                name: "min",
                seconds: 60.0,
            }
        } else {
            Self {
                name: "s",
                seconds: 1.0,
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn verify_round_steps() {
        assert_eq!(round_step(15.0, 15.0), 1.0);
        assert_eq!(round_step(900.0, 5.0), 200.0);
        assert_eq!(round_step(0.0, 5.0), 1.0);
        assert_eq!(round_step(f64::NAN, 5.0), 1.0);
        assert_eq!(ticks(0.0, 1.0, 0.5), vec![0.0, 0.5, 1.0]);
        assert_eq!(tick_text(0.25, 0.25), "0.25");
        assert_eq!(tick_text(-0.0, 5.0), "0");
    }
}
