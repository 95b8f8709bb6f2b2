//! A bar on standard error for runs that take longer than a second.

use super::streams;
use indicatif::{ProgressBar, ProgressStyle};
use std::time::{Duration, Instant};

/// Runs shorter than this need no bar.
const PATIENCE: Duration = Duration::from_secs(1);

/// Shows how far a run is; nothing when nobody watches.
pub struct Progress {
    begun: Instant,
    end: f64,
    bar: Option<ProgressBar>,
}

impl Progress {
    /// For a run to `end`, s of simulated time.
    pub fn new(end: f64) -> Self {
        Self {
            begun: Instant::now(),
            end,
            bar: None,
        }
    }

    /// The run has reached `time`, s of simulated time.
    pub fn reached(&mut self, time: f64) {
        if self.bar.is_none() && self.begun.elapsed() > PATIENCE && streams::is_side_watched() {
            self.bar = Some(bar(self.end));
        }
        if let Some(bar) = &self.bar {
            bar.set_position(whole(time));
        }
    }

    /// Takes the bar away.
    pub fn finish(self) {
        if let Some(bar) = self.bar {
            bar.finish_and_clear();
        }
    }
}

fn bar(end: f64) -> ProgressBar {
    let bar = ProgressBar::new(whole(end));
    if let Ok(style) = ProgressStyle::with_template("{bar:40} {pos} of {len} s simulated") {
        bar.set_style(style);
    }
    bar
}

fn whole(seconds: f64) -> u64 {
    // Simulated times are hours at most; a cast from a float saturates.
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
    let whole = seconds.max(0.0) as u64;
    whole
}
