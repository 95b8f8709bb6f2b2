//! Clear widths of the openings over time, and the times at which the run
//! stops and starts again.

use crate::plan::{Burning, Curve, Opening, OpeningKind, Plan};

/// One stretch over which a clear width runs linearly.
#[derive(Debug, Clone, Copy)]
struct Move {
    start: f64,
    end: f64,
    from: f64,
    to: f64,
}

/// Clear widths of all openings over time.
#[derive(Debug, Clone)]
pub struct Schedule {
    moves: Vec<Vec<Move>>,
    /// Times in (0, end) at which the integration lands, rising.
    pub landings: Vec<Landing>,
}

/// A time at which the integration lands.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Landing {
    /// Time, s.
    pub time: f64,
    /// Restart with a small step (something jumps); otherwise only a kink.
    pub restart: bool,
}

/// Most points of a table on which the integration lands.
const MOST_TABLE_LANDINGS: usize = 2000;

impl Schedule {
    /// Works out a plan's schedule. Later actions on the same opening take
    /// over from wherever it is.
    pub fn new(plan: &Plan) -> Self {
        let mut schedule = Self {
            moves: vec![Vec::new(); plan.openings.len()],
            landings: Vec::new(),
        };
        let mut jumps = Vec::new();
        for action in &plan.actions {
            let o = action.opening.0;
            let from = schedule.clear_width(&plan.openings[o], o, action.time);
            if let Some(last) = schedule.moves[o].last_mut() {
                last.end = last.end.min(action.time.max(last.start));
                last.to = from;
            }
            let end = action.time + action.over.max(0.0);
            schedule.moves[o].push(Move {
                start: action.time,
                end,
                from,
                to: action.clear_width,
            });
            jumps.extend([action.time, end]);
        }
        let mut kinks = Vec::new();
        for item in &plan.items {
            jumps.push(item.ignition);
            match &item.burning {
                Burning::Burner { ramp, .. } => kinks.push(item.ignition + ramp),
                Burning::AsGiven(Curve::Table(points)) if points.len() <= MOST_TABLE_LANDINGS => {
                    kinks.extend(points.iter().map(|p| item.ignition + p.0));
                }
                Burning::AsGiven(Curve::Growth { alpha, peak }) => {
                    kinks.push(item.ignition + (peak / alpha).sqrt());
                }
                _ => {}
            }
        }
        schedule.landings = merge(&jumps, &kinks, plan.end);
        schedule
    }

    /// Rate at which an opening widens at a time, m/s.
    pub fn widening(&self, index: usize, time: f64) -> f64 {
        match self.moves[index].iter().rev().find(|m| m.start <= time) {
            Some(m) if time < m.end => (m.to - m.from) / (m.end - m.start),
            _ => 0.0,
        }
    }

    /// Clear width of an opening at a time, m.
    pub fn clear_width(&self, opening: &Opening, index: usize, time: f64) -> f64 {
        let moves = &self.moves[index];
        match moves.iter().rev().find(|m| m.start <= time) {
            None => opening.clear_width,
            Some(m) if time >= m.end => m.to,
            Some(m) => m.from + (m.to - m.from) * (time - m.start) / (m.end - m.start),
        }
    }
}

/// How an opening stands at one moment.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub struct Stand {
    /// Clear width, m.
    pub clear_width: f64,
    /// Flow coefficient times width, gap included, m.
    pub coefficient_width: f64,
    /// Share of it that is gap.
    pub leak_share: f64,
}

/// How an opening stands at a clear width.
pub fn stand(opening: &Opening, clear_width: f64) -> Stand {
    let height = opening.head - opening.sill;
    let shut_share = if opening.kind == OpeningKind::Gap || opening.width <= 0.0 {
        1.0
    } else {
        (1.0 - clear_width / opening.width).clamp(0.0, 1.0)
    };
    let gap = opening.gap_coefficient * opening.gap_area / height * shut_share;
    let open = opening.coefficient * clear_width;
    let whole = open + gap;
    Stand {
        clear_width,
        coefficient_width: whole,
        leak_share: if whole > 0.0 { gap / whole } else { 1.0 },
    }
}

fn merge(jumps: &[f64], kinks: &[f64], end: f64) -> Vec<Landing> {
    let mut landings: Vec<Landing> = jumps
        .iter()
        .map(|&time| (time, true))
        .chain(kinks.iter().map(|&time| (time, false)))
        .filter(|(time, _)| *time > 0.0 && *time < end)
        .map(|(time, restart)| Landing { time, restart })
        .collect();
    landings.sort_by(|a, b| a.time.total_cmp(&b.time).then(b.restart.cmp(&a.restart)));
    landings.dedup_by(|later, first| later.time - first.time < 1e-6);
    landings
}
