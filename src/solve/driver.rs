//! The model behind the integrator's door, and which rooms it holds at a
//! dynamic pressure of their own because a quasi-steady one would be too high.

use super::derivative::{Model, Refusal};
use super::groups::{OVERPRESSURE, RELEASE};
use super::integrator::Equations;

/// Share of a stretch by which evaluations keep off its ends, so that what
/// jumps there is seen from inside.
const INSIDE: f64 = 1e-9;

/// The model with what the run needs to know about it.
pub struct Driver<'a, 'w> {
    /// The model.
    pub model: Model<'a>,
    /// Evaluations asked for by the integrator.
    pub evaluations: u64,
    /// The user stopped the run.
    pub interrupted: bool,
    /// Rooms made tight for their pressure.
    pub forced: Vec<bool>,
    watch: &'w mut dyn FnMut(f64) -> bool,
    window: (f64, f64),
}

impl<'a, 'w> Driver<'a, 'w> {
    /// A driver at the start of a run.
    pub fn new(model: Model<'a>, watch: &'w mut dyn FnMut(f64) -> bool) -> Self {
        let rooms = model.building.rooms.len();
        Self {
            model,
            evaluations: 0,
            interrupted: false,
            forced: vec![false; rooms],
            watch,
            window: (0.0, 0.0),
        }
    }

    /// Keeps the evaluations to come inside a stretch.
    pub fn keep_within(&mut self, start: f64, end: f64) {
        let inside = INSIDE * (end - start);
        self.window = (start + inside, end - inside);
    }

    /// Evaluates the model inside the present stretch.
    ///
    /// # Errors
    /// As [`Model::evaluate`].
    pub fn evaluate(&mut self, time: f64, y: &[f64], dy: &mut [f64]) -> Result<(), Refusal> {
        let (start, end) = self.window;
        self.model.evaluate(time.clamp(start, end), y, dy)
    }

    /// Mean pressure of a room's tight group, Pa, zero outside of them.
    fn mean(&self, room: usize) -> f64 {
        let groups = &self.model.groups;
        let group = groups.iter().position(|g| g.rooms.contains(&room));
        group.map_or(0.0, |g| self.model.group_pressure(g))
    }

    fn strained(&self, room: usize) -> bool {
        let strain = self.model.balance.pressure(room) - self.mean(room);
        strain.abs() > OVERPRESSURE && !self.forced[room]
    }

    /// True when a group with rooms made tight is nearly even with the outside
    /// and still falling.
    fn relieved(&self, group: usize) -> bool {
        let model = &self.model;
        let pressure = model.group_pressure(group);
        pressure.abs() < RELEASE
            && pressure * model.balance.group_rate(group) < 0.0
            && model.groups[group].rooms.iter().any(|r| self.forced[*r])
    }

    /// After the last evaluation: makes rooms at too high a quasi-steady
    /// pressure tight, and lets go of those that have come down. True when
    /// something changed.
    pub fn adapt(&mut self) -> bool {
        let before = self.forced.clone();
        for group in 0..self.model.groups.len() {
            if self.relieved(group) {
                for &room in &self.model.groups[group].rooms {
                    self.forced[room] = false;
                }
            }
        }
        for room in 0..before.len() {
            self.forced[room] |= !before[room] && self.strained(room);
        }
        self.forced != before
    }

    /// After a refusal for want of balance: makes the rooms tight at which the
    /// search for it ran away. True when something changed.
    pub fn adapt_to_refusal(&mut self) -> bool {
        if self.model.refusal != Some(Refusal::Pressure) {
            return false;
        }
        let before = self.forced.clone();
        for room in 0..before.len() {
            let strain = self.model.balance.tried(room) - self.mean(room);
            self.forced[room] |= strain.is_nan() || strain.abs() > OVERPRESSURE;
        }
        self.forced != before
    }
}

impl Equations for Driver<'_, '_> {
    fn rates(&mut self, time: f64, y: &[f64], dy: &mut [f64]) -> bool {
        self.evaluations += 1;
        self.evaluate(time, y, dy).is_ok()
    }

    fn accepted(&mut self, time: f64, _y: &[f64]) -> bool {
        self.interrupted = (self.watch)(time);
        self.interrupted
            || (0..self.forced.len()).any(|room| self.strained(room))
            || (0..self.model.groups.len()).any(|group| self.relieved(group))
    }
}
