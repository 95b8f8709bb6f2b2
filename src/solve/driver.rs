//! The model behind the integrator's door, and which openings it takes for
//! tight, so that the rooms behind them have a dynamic pressure of their own,
//! because a quasi-steady difference across them would be too high.

use super::derivative::{Model, Refusal};
use super::groups::{OVERPRESSURE, RELEASE};
use super::integrator::Equations;
use super::triggers::Triggers;

/// Share of a stretch by which evaluations keep off its ends, so that what
/// jumps there is seen from inside.
const INSIDE: f64 = 1e-9;

/// Time for which an opening stays cut, s, so that a room whose pressure
/// swings is not cut and let go at every step.
const HOLD: f64 = 1.0;

/// The model with what the run needs to know about it.
pub struct Driver<'a, 'w> {
    /// The model.
    pub model: Model<'a>,
    /// Evaluations asked for by the integrator.
    pub evaluations: u64,
    /// The user stopped the run.
    pub interrupted: bool,
    /// Openings taken for tight for the difference across them.
    pub cut: Vec<bool>,
    /// Changes that wait for a condition.
    pub triggers: Triggers,
    /// When each of them was cut last, s.
    since: Vec<f64>,
    /// Time of the last evaluation, s.
    time: f64,
    watch: &'w mut dyn FnMut(f64) -> bool,
    window: (f64, f64),
}

impl<'a, 'w> Driver<'a, 'w> {
    /// A driver at the start of a run.
    pub fn new(model: Model<'a>, watch: &'w mut dyn FnMut(f64) -> bool) -> Self {
        let openings = model.plan.openings.len();
        Self {
            evaluations: 0,
            interrupted: false,
            cut: vec![false; openings],
            triggers: Triggers::new(model.plan.triggers.len()),
            since: vec![0.0; openings],
            time: 0.0,
            model,
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
        self.time = time;
        self.model.evaluate(time.clamp(start, end), y, dy)
    }

    /// Pressure difference across an opening by the given room pressures, when
    /// there is a way through.
    fn difference(&self, opening: usize, pressure: impl Fn(usize) -> f64) -> Option<f64> {
        let passage = &self.model.balance.passages[opening];
        let [first, second] = passage.rooms().map(|room| room.map_or(0.0, &pressure));
        (passage.stand.coefficient_width > 0.0).then_some(first - second)
    }

    /// Difference towards which a dynamic one is on its way, Pa: a way out evens
    /// a group's pressure at a rate that goes with the root of the difference.
    fn destination(&self, opening: usize, difference: f64) -> f64 {
        let balance = &self.model.balance;
        let (mut rate, mut evening) = (0.0, 0.0);
        for (room, sign) in balance.passages[opening]
            .rooms()
            .into_iter()
            .zip([1.0, -1.0])
        {
            if let Some(group) = room.and_then(|r| self.model.group_of(r)) {
                rate += sign * balance.group_rate(group);
                evening += balance.evening(group);
            }
        }
        let root = difference.abs().sqrt().copysign(difference) + rate / evening.max(1e-9);
        root * root
    }

    /// True when both sides of an opening share one mean pressure, that of a
    /// tight group or the outside's, so that its difference is quasi-steady.
    fn quasi_steady(&self, opening: usize) -> bool {
        let rooms = self.model.balance.passages[opening].rooms();
        let [first, second] = rooms.map(|room| room.and_then(|r| self.model.group_of(r)));
        first == second
    }

    /// True when an opening that is not cut has too high a quasi-steady
    /// difference by the given pressures.
    fn strained(&self, opening: usize, pressure: impl Fn(usize) -> f64) -> bool {
        !self.cut[opening]
            && self.quasi_steady(opening)
            && self
                .difference(opening, pressure)
                .is_some_and(|p| p.is_nan() || p.abs() > OVERPRESSURE)
    }

    /// True when the difference across a cut opening is small again and will
    /// stay so, or when it is shut.
    fn relieved(&self, opening: usize) -> bool {
        let pressure = |room| self.model.balance.pressure(room);
        self.cut[opening]
            && self.time - self.since[opening] > HOLD
            && self
                .difference(opening, pressure)
                .is_none_or(|p| p.abs() < RELEASE && self.destination(opening, p) < 2.0 * RELEASE)
    }

    /// True when by the last evaluation, at this time and state, an opening is to
    /// be cut or let go, or a trigger is passed.
    pub fn calls_for_change(&self, time: f64, y: &[f64]) -> bool {
        if self.triggers.passed(&self.model, time, y).is_some() {
            return true;
        }
        let pressure = |room| self.model.balance.pressure(room);
        (0..self.cut.len()).any(|o| self.relieved(o) || self.strained(o, pressure))
    }

    /// After the last evaluation: cuts openings across which the quasi-steady
    /// difference is too high, and lets go of those where it is over. True
    /// when something changed.
    pub fn adapt(&mut self) -> bool {
        let relieved: Vec<bool> = (0..self.cut.len()).map(|o| self.relieved(o)).collect();
        let mut changed = self.adapt_up();
        for (cut, relieved) in self.cut.iter_mut().zip(relieved) {
            changed |= relieved;
            *cut &= !relieved;
        }
        changed
    }

    /// As [`Driver::adapt`], letting none go.
    pub fn adapt_up(&mut self) -> bool {
        let pressure = |room| self.model.balance.pressure(room);
        let strained: Vec<bool> = (0..self.cut.len())
            .map(|o| self.strained(o, pressure))
            .collect();
        self.cut_also(&strained)
    }

    /// After a refusal for want of balance: cuts the openings across which the
    /// search for it ran away. True when something changed.
    pub fn adapt_to_refusal(&mut self) -> bool {
        if self.model.refusal != Some(Refusal::Pressure) {
            return false;
        }
        let tried = |room| self.model.balance.tried(room);
        let strained: Vec<bool> = (0..self.cut.len())
            .map(|o| self.strained(o, tried))
            .collect();
        self.cut_also(&strained)
    }

    fn cut_also(&mut self, also: &[bool]) -> bool {
        for (n, also) in also.iter().enumerate() {
            if *also {
                self.cut[n] = true;
                self.since[n] = self.time;
            }
        }
        also.iter().any(|also| *also)
    }
}

impl Equations for Driver<'_, '_> {
    fn rates(&mut self, time: f64, y: &[f64], dy: &mut [f64]) -> bool {
        self.evaluations += 1;
        self.evaluate(time, y, dy).is_ok()
    }

    fn accepted(&mut self, time: f64, y: &[f64]) -> bool {
        self.interrupted = (self.watch)(time);
        self.interrupted || self.calls_for_change(time, y)
    }
}
