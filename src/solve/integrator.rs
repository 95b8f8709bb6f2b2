//! The only door to `ode_solvers`: its Dopri5 (Dormand and Prince 1980, order
//! 5(4)) in scaled variables, with what its traps ask for. Only Dopri5 is
//! used; its eighth-order sibling is first order on time-dependent systems.
//!
//! - Output is read off the continuous model, never its own dense output.
//! - Its continuous model keeps the absolute values of its break points, so
//!   times before zero are shifted; it panics when asked for not-a-number.
//! - The stiffness check is off; fast pressures are algebraic in this house.
//! - A refused evaluation gives slopes so steep that the step is rejected; the
//!   accepted state is checked for being finite and a fault is latched.

use nalgebra::DVector;
use ode_solvers::continuous_output_model::ContinuousOutputModel;
use ode_solvers::dop_shared::OutputType;
use ode_solvers::{Dopri5, System};
use std::cell::RefCell;

/// Slope that stands for a refused evaluation, in scaled units per second.
const REFUSED_SLOPE: f64 = 1e12;

/// Evaluations of one step.
const STAGES: u32 = 6;

/// Most steps of one stretch.
const MOST_STEPS: u32 = 200_000;

/// A system of ordinary differential equations in its own units.
pub trait Equations {
    /// Rates of change at a time and state; false when the state is refused.
    fn rates(&mut self, time: f64, y: &[f64], dy: &mut [f64]) -> bool;

    /// Called at every accepted step; true stops the integration there.
    fn accepted(&mut self, time: f64, y: &[f64]) -> bool;
}

/// How a stretch is to be integrated.
#[derive(Debug, Clone, Copy)]
pub struct Stretch {
    /// Start, s.
    pub start: f64,
    /// End, s, after the start.
    pub end: f64,
    /// First step, s.
    pub first_step: f64,
    /// Longest step, s.
    pub longest_step: f64,
    /// Relative tolerance.
    pub relative: f64,
    /// Absolute tolerance in scaled units.
    pub absolute: f64,
}

/// How a stretch ended.
#[derive(Debug, Clone, PartialEq)]
pub enum Outcome {
    /// At its end.
    Reached,
    /// Where [`Equations::accepted`] stopped it.
    Stopped,
    /// It could not go on, and why.
    Failed(String),
}

/// A stretch that was integrated.
pub struct Solution {
    model: ContinuousOutputModel<f64, DVector<f64>>,
    scale: Vec<f64>,
    shift: f64,
    /// Time reached, s.
    pub time: f64,
    /// State there, in its own units.
    pub state: Vec<f64>,
    /// How it ended.
    pub outcome: Outcome,
    /// Evaluations.
    pub evaluations: u64,
    /// Accepted steps.
    pub steps: u64,
    /// Rejected steps.
    pub rejections: u64,
    /// Start of the last step, s.
    pub before: f64,
    /// Mean accepted step, s, as a start for the next stretch.
    pub last_step: f64,
}

impl Solution {
    /// Nothing but the start.
    fn none(scale: &[f64], stretch: &Stretch, state: &[f64]) -> Self {
        Self {
            model: ContinuousOutputModel::default(),
            scale: scale.to_vec(),
            shift: 0.0,
            time: stretch.start,
            state: state.to_vec(),
            outcome: Outcome::Failed("it could not start".into()),
            evaluations: 1,
            steps: 0,
            rejections: 0,
            before: stretch.start,
            last_step: stretch.first_step,
        }
    }

    /// State at a time inside the stretch, off the interpolant of order 4.
    pub fn at(&self, time: f64) -> Option<Vec<f64>> {
        if time.is_nan() {
            return None;
        }
        if time >= self.time {
            return (time <= self.time + 1e-9).then(|| self.state.clone());
        }
        let scaled = self.model.evaluate(time - self.shift)?;
        Some(scaled.iter().zip(&self.scale).map(|(y, s)| y * s).collect())
    }
}

struct Inner<'a, E> {
    equations: &'a mut E,
    y: Vec<f64>,
    dy: Vec<f64>,
    fault: Option<String>,
    stopped: bool,
    /// Refused evaluations so far, and evaluations since the last one.
    refusals: u32,
    since_refusal: u32,
    time: f64,
    before: f64,
    last_step: f64,
}

struct Adapter<'a, 'b, E> {
    inner: &'b RefCell<Inner<'a, E>>,
    scale: &'b [f64],
    shift: f64,
}

impl<E: Equations> System<f64, DVector<f64>> for Adapter<'_, '_, E> {
    fn system(&self, time: f64, scaled: &DVector<f64>, rates: &mut DVector<f64>) {
        let inner = &mut *self.inner.borrow_mut();
        let mut finite = true;
        for ((y, x), s) in inner.y.iter_mut().zip(scaled.iter()).zip(self.scale) {
            *y = x * s;
            finite &= y.is_finite();
        }
        let taken = finite
            && inner
                .equations
                .rates(time + self.shift, &inner.y, &mut inner.dy);
        inner.since_refusal = inner.since_refusal.saturating_add(1);
        if !taken || inner.dy.iter().any(|r| !r.is_finite()) {
            inner.since_refusal = 0;
            // Never twice the same: equal slopes in all stages of a step would
            // cancel in its error estimate.
            inner.refusals = inner.refusals.wrapping_add(1);
            let sign = if inner.refusals.is_multiple_of(2) {
                1.0
            } else {
                -1.0
            };
            rates.fill(sign * REFUSED_SLOPE * f64::from(1 + inner.refusals % 5));
            return;
        }
        for ((r, dy), s) in rates.iter_mut().zip(&inner.dy).zip(self.scale) {
            *r = dy / s;
        }
    }

    fn solout(&mut self, time: f64, scaled: &DVector<f64>, _rates: &DVector<f64>) -> bool {
        let inner = &mut *self.inner.borrow_mut();
        for ((y, x), s) in inner.y.iter_mut().zip(scaled.iter()).zip(self.scale) {
            *y = x * s;
        }
        let time = time + self.shift;
        inner.last_step = time - inner.time;
        inner.before = inner.time;
        inner.time = time;
        // A step so small that refused slopes pass its error test is no step.
        if inner.since_refusal < STAGES {
            inner.fault = Some("no step was small enough".into());
            return true;
        }
        if inner.y.iter().any(|y| !y.is_finite()) {
            inner.fault = Some("a quantity is no longer a number".into());
            return true;
        }
        inner.stopped = inner.equations.accepted(time, &inner.y);
        inner.stopped
    }
}

/// Integrates one stretch from a state in its own units.
pub fn integrate<E: Equations>(
    equations: &mut E,
    scale: &[f64],
    stretch: &Stretch,
    state: &[f64],
) -> Solution {
    // Refused slopes from the start on would all be alike and show no error.
    let mut dy = vec![0.0; state.len()];
    let taken = state.iter().all(|y| y.is_finite())
        && equations.rates(stretch.start, state, &mut dy)
        && dy.iter().all(|r| r.is_finite());
    if !taken {
        return Solution::none(scale, stretch, state);
    }
    let inner = RefCell::new(Inner {
        equations,
        y: state.to_vec(),
        dy,
        fault: None,
        stopped: false,
        refusals: 0,
        since_refusal: u32::MAX,
        time: stretch.start,
        before: stretch.start,
        last_step: stretch.first_step,
    });
    let scaled = DVector::from_iterator(state.len(), state.iter().zip(scale).map(|(y, s)| y / s));
    let length = stretch.end - stretch.start;
    let shift = stretch.start.min(0.0);
    let mut model = ContinuousOutputModel::default();
    let mut stepper = Dopri5::from_param(
        Adapter {
            inner: &inner,
            scale,
            shift,
        },
        stretch.start - shift,
        stretch.end - shift,
        length,
        scaled,
        stretch.relative,
        stretch.absolute,
        0.9,
        0.04,
        0.2,
        10.0,
        stretch.longest_step.min(length),
        stretch.first_step.min(length),
        MOST_STEPS,
        u32::MAX,
        OutputType::Continuous,
    );
    let result = stepper.integrate_with_continuous_output_model(&mut model);
    // A state at fault is not handed out; the one before it is.
    let fault = usize::from(inner.borrow().fault.is_some());
    let last = stepper.y_out().iter().rev().nth(fault).cloned();
    let steps = stepper.x_out().len() as u64;
    drop(stepper);
    let inner = inner.into_inner();
    let outcome = match (&result, inner.fault, inner.stopped) {
        (_, Some(fault), _) => Outcome::Failed(fault),
        (Err(error), None, _) => Outcome::Failed(explain(error)),
        (Ok(_), None, true) => Outcome::Stopped,
        (Ok(_), None, false) => Outcome::Reached,
    };
    let state = last.map_or_else(
        || state.to_vec(),
        |scaled| scaled.iter().zip(scale).map(|(x, s)| x * s).collect(),
    );
    let stats = result.ok();
    Solution {
        model,
        scale: scale.to_vec(),
        shift,
        time: match outcome {
            Outcome::Reached => stretch.end,
            _ if fault > 0 => inner.before,
            _ => inner.time,
        },
        state,
        outcome,
        evaluations: stats.map_or(0, |s| u64::from(s.num_eval)),
        steps,
        rejections: stats.map_or(0, |s| u64::from(s.rejected_steps)),
        before: inner.before,
        last_step: inner.last_step,
    }
}

fn explain(error: &ode_solvers::dop_shared::IntegrationError) -> String {
    use ode_solvers::dop_shared::IntegrationError as E;
    match error {
        E::MaxNumStepReached { .. } => "more steps were needed than are allowed".into(),
        E::StepSizeUnderflow { .. } => "no step was small enough".into(),
        E::StiffnessDetected { .. } => "the equations became stiff".into(),
    }
}
