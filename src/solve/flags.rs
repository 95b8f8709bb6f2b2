//! What a user should know about a run: states in which two layers are
//! doubtful and sub-models outside their tested range.

use super::derivative::Model;
use super::layout::{LOWER, UPPER};
use crate::physics::gas::FIRST_FUEL;
use crate::plan::Plan;
use crate::record::Flag;

/// Gauge pressure above which windows and doors leak or fail first, Pa.
const HIGH_PRESSURE: f64 = 500.0;

/// Difference of layer temperatures below which a warm room counts as nearly
/// mixed, K.
const NEARLY_MIXED: f64 = 15.0;

/// Warmth above the start at which the question of mixing matters, K.
const WARM: f64 = 40.0;

/// Unburned fuel by mass that makes the ignition window matter.
const RICH: f64 = 0.02;

/// Shortest time a state must last to be flagged, s.
const SHORTEST: f64 = 20.0;

/// One watched state.
#[derive(Debug, Clone)]
struct Watched {
    what: String,
    since: Option<f64>,
    duration: f64,
    last: Option<f64>,
}

/// Watches the output rows of a run.
#[derive(Debug, Clone)]
pub struct Watch {
    watched: Vec<Watched>,
    rooms: usize,
}

/// States watched per room.
const PER_ROOM: usize = 4;

impl Watch {
    /// Watches for a plan.
    pub fn new(plan: &Plan) -> Self {
        let mut watched = Vec::new();
        for room in &plan.rooms {
            for what in [
                format!(
                    "{}: pressure above 500 Pa; windows and doors would leak more or fail",
                    room.name
                ),
                format!(
                    "{}: nearly mixed; two layers say little, oxygen may be 1 to 3 points too low",
                    room.name
                ),
                format!(
                    "{}: unburned fuel above 2 % in smoke of 400 to 600 °C; when it lights is uncertain",
                    room.name
                ),
                format!(
                    "{}: longer than five times its width; the far end does not get the fire's own gas at once",
                    room.name
                ),
            ] {
                watched.push(Watched {
                    what,
                    since: None,
                    duration: 0.0,
                    last: None,
                });
            }
        }
        Self {
            watched,
            rooms: plan.rooms.len(),
        }
    }

    /// Looks at the model at an output time.
    pub fn look(&mut self, model: &Model<'_>, time: f64) {
        for room in 0..self.rooms {
            let hull = &model.building.rooms[room];
            let low = &model.layers.layers[2 * room + LOWER];
            let up = &model.layers.layers[2 * room + UPPER];
            let fuel: f64 = model.layers.fractions(2 * room + UPPER)[FIRST_FUEL..]
                .iter()
                .sum();
            let long = hull.length.max(hull.width) / hull.length.min(hull.width);
            let now = [
                model.balance.pressure(room).abs() > HIGH_PRESSURE,
                up.temperature - hull.start > WARM
                    && up.temperature - low.temperature < NEARLY_MIXED,
                fuel > RICH && up.temperature > 673.15 && up.temperature < 873.15,
                long > 5.0 && up.temperature - hull.start > WARM,
            ];
            for (n, on) in now.into_iter().enumerate() {
                let watched = &mut self.watched[room * PER_ROOM + n];
                if on {
                    watched.since.get_or_insert(time);
                    if let Some(last) = watched.last {
                        watched.duration += time - last;
                    }
                    watched.last = Some(time);
                } else {
                    watched.last = None;
                }
            }
        }
    }

    /// The flags that lasted, in order of time.
    pub fn finish(self) -> Vec<Flag> {
        let mut flags: Vec<Flag> = self
            .watched
            .into_iter()
            .filter_map(|w| {
                let since = w.since?;
                let pressure = w.what.contains("Pa;");
                (w.duration >= SHORTEST || pressure).then_some(Flag {
                    since,
                    duration: w.duration,
                    what: w.what,
                })
            })
            .collect();
        flags.sort_by(|a, b| a.since.total_cmp(&b.since));
        flags
    }
}
