//! Clear widths of the openings over time, and the times at which the run
//! stops and starts again.

use crate::plan::{Burning, Curve, Effect, Opening, OpeningKind, Plan};

/// One stretch over which a clear width runs linearly.
#[derive(Debug, Clone, Copy)]
struct Move {
    start: f64,
    end: f64,
    from: f64,
    to: f64,
}

/// Something that moves over time from where it stands at ignition: the clear
/// width of an opening (m) or the running of a fan (0..1).
#[derive(Debug, Clone)]
struct Track {
    start: f64,
    moves: Vec<Move>,
}

impl Track {
    /// Value when the moves that begin at `time` have begun.
    fn at(&self, time: f64) -> f64 {
        self.after(self.moves.partition_point(|m| m.start <= time), time)
    }

    /// Value just before `time`.
    fn before(&self, time: f64) -> f64 {
        self.after(self.moves.partition_point(|m| m.start < time), time)
    }

    /// Value at a time by the first moves only.
    fn after(&self, moves: usize, time: f64) -> f64 {
        match self.moves[..moves].last() {
            None => self.start,
            Some(m) if time >= m.end => m.to,
            Some(m) => m.from + (m.to - m.from) * (time - m.start) / (m.end - m.start),
        }
    }

    fn rate(&self, time: f64) -> f64 {
        match self.moves.iter().rev().find(|m| m.start <= time) {
            Some(m) if time < m.end => (m.to - m.from) / (m.end - m.start),
            _ => 0.0,
        }
    }

    /// Puts a move in among those known; each begins from wherever the one
    /// before has come to. What waits may be known after what comes later.
    fn push(&mut self, time: f64, over: f64, to: f64) {
        let place = self.moves.partition_point(|m| m.start <= time);
        let (start, end) = (time, time + over);
        self.moves.insert(
            place,
            Move {
                start,
                end,
                from: to,
                to,
            },
        );
        for n in place..self.moves.len() {
            self.moves[n].from = self.after(n, self.moves[n].start);
        }
    }
}

/// Clear widths of all openings and running of all fans over time.
#[derive(Debug, Clone)]
pub struct Schedule {
    openings: Vec<Track>,
    fans: Vec<Track>,
    /// Times in (0, end) at which the integration lands, rising.
    pub landings: Vec<Landing>,
    end: f64,
}

/// A time at which the integration lands.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Landing {
    /// Time, s.
    pub time: f64,
    /// Restart with a small step (something jumps); otherwise only a kink.
    pub restart: bool,
}

/// Time in which a fan comes up to speed or stops, s (own choice).
const FAN_RAMP: f64 = 2.0;

/// Most points of a table on which the integration lands.
const MOST_TABLE_LANDINGS: usize = 2000;

impl Schedule {
    /// Works out a plan's schedule. Later actions on the same opening take
    /// over from wherever it is.
    pub fn new(plan: &Plan) -> Self {
        let mut schedule = Self {
            openings: plan.openings.iter().map(|o| still(o.clear_width)).collect(),
            fans: plan
                .fans
                .iter()
                .map(|f| still(f64::from(u8::from(f.running))))
                .collect(),
            landings: Vec::new(),
            end: plan.end,
        };
        let mut jumps = Vec::new();
        for action in &plan.actions {
            let end = schedule.begin(action.effect, action.time, action.over);
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

    /// Begins a change; gives the time at which it is done, s.
    fn begin(&mut self, effect: Effect, time: f64, over: f64) -> f64 {
        match effect {
            Effect::ClearWidth { opening, width } => {
                let over = over.max(0.0);
                self.openings[opening.0].push(time, over, width);
                time + over
            }
            Effect::Fan { fan, running } => {
                let over = over.max(FAN_RAMP);
                self.fans[fan.0].push(time, over, f64::from(u8::from(running)));
                time + over
            }
        }
    }

    /// Takes in a change that was not known at ignition, and lands on it.
    pub fn add(&mut self, effect: Effect, time: f64, over: f64) {
        let end = self.begin(effect, time, over);
        let known: Vec<f64> = self
            .landings
            .iter()
            .filter(|l| l.restart)
            .map(|l| l.time)
            .collect();
        let kinks: Vec<f64> = self
            .landings
            .iter()
            .filter(|l| !l.restart)
            .map(|l| l.time)
            .collect();
        let jumps: Vec<f64> = known.into_iter().chain([time, end]).collect();
        self.landings = merge(&jumps, &kinks, self.end);
    }

    /// Rate at which an opening widens at a time, m/s.
    pub fn widening(&self, opening: usize, time: f64) -> f64 {
        self.openings[opening].rate(time)
    }

    /// Clear width of an opening at a time, m.
    pub fn clear_width(&self, opening: usize, time: f64) -> f64 {
        self.openings[opening].at(time)
    }

    /// Clear width of an opening just before a time, m.
    pub fn clear_width_before(&self, opening: usize, time: f64) -> f64 {
        self.openings[opening].before(time)
    }

    /// How far a fan runs at a time, 0..1.
    pub fn running(&self, fan: usize, time: f64) -> f64 {
        self.fans[fan].at(time)
    }
}

fn still(start: f64) -> Track {
    Track {
        start,
        moves: Vec::new(),
    }
}

/// How an opening stands at one moment.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub struct Stand {
    /// Clear width, m.
    pub clear_width: f64,
    /// Flow coefficient times width, gap included, m; times area (m2) for a
    /// horizontal opening.
    pub coefficient_width: f64,
    /// Share of it that is gap.
    pub leak_share: f64,
}

/// How an opening stands at a clear width.
pub fn stand(opening: &Opening, clear_width: f64) -> Stand {
    if opening.kind.is_horizontal() {
        return lying(opening, clear_width);
    }
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

fn lying(opening: &Opening, clear_width: f64) -> Stand {
    let share = (clear_width / opening.width).clamp(0.0, 1.0);
    let gap = opening.gap_coefficient * opening.gap_area * (1.0 - share);
    Stand {
        clear_width,
        coefficient_width: opening.coefficient * opening.area * share + gap,
        leak_share: 0.0,
    }
}

/// Flow coefficient times area of an opening, m2.
pub fn coefficient_area(opening: &Opening, stand: &Stand) -> f64 {
    if opening.kind.is_horizontal() {
        stand.coefficient_width
    } else {
        stand.coefficient_width * (opening.head - opening.sill)
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
