//! What was changed in a run and when: actions of the plan and triggers that
//! fired, in one list.

use crate::plan::{Effect, Plan};
use crate::record::Record;

/// A change as it was played.
#[derive(Debug, Clone, Copy)]
pub(super) struct Played<'a> {
    /// Name of the action or trigger.
    pub name: &'a str,
    /// When it began, s.
    pub time: f64,
    /// What it changed.
    pub effect: Effect,
    /// What was done, in words.
    pub what: &'a str,
    /// Why, in the user's words.
    pub because: Option<&'a str>,
    /// Clear width of its opening before it, m; 0 for a fan.
    pub before: f64,
    /// True when nobody did it: glass or a door gave way.
    pub by_itself: bool,
}

impl Played<'_> {
    /// Index of the opening that it moved.
    pub fn opening(&self) -> Option<usize> {
        self.effect.opening().map(|opening| opening.0)
    }

    /// Clear width of its opening when done, m; `None` for a fan.
    pub fn after(&self) -> Option<f64> {
        match self.effect {
            Effect::ClearWidth { width, .. } => Some(width),
            Effect::Fan { .. } => None,
        }
    }

    /// True when it makes its opening wider.
    pub fn opens(&self) -> bool {
        self.after().is_some_and(|after| after > self.before)
    }

    /// True when it makes its opening narrower.
    pub fn narrows(&self) -> bool {
        self.after().is_some_and(|after| after < self.before)
    }
}

/// Changes that begin by `end`, by time, with the clear width that each one
/// found. Glass that falls out of a window that is open as wide already is
/// left out.
pub(super) fn played<'a>(record: &Record, plan: &'a Plan, end: f64) -> Vec<Played<'a>> {
    let mut all: Vec<Played<'a>> = plan
        .actions
        .iter()
        .map(|action| Played {
            name: &action.name,
            time: action.time,
            effect: action.effect,
            what: &action.what,
            because: action.because.as_deref(),
            before: 0.0,
            by_itself: gives_way(&action.what),
        })
        .collect();
    all.extend(record.fired.iter().filter_map(|fired| {
        let trigger = plan.triggers.get(fired.trigger)?;
        Some(Played {
            name: &trigger.name,
            time: fired.time,
            effect: trigger.effect,
            what: &trigger.what,
            because: trigger.because.as_deref(),
            before: 0.0,
            by_itself: trigger.only_widens,
        })
    }));
    all.retain(|played| played.time <= end);
    all.sort_by(|a, b| a.time.total_cmp(&b.time));
    let mut widths: Vec<f64> = plan.openings.iter().map(|o| o.clear_width).collect();
    all.retain_mut(|played| {
        let Some(opening) = played.opening() else {
            return true;
        };
        let (Some(width), Some(after)) = (widths.get_mut(opening), played.after()) else {
            return false;
        };
        played.before = *width;
        let idle = played.by_itself && after <= *width;
        if !idle {
            *width = after;
        }
        !idle
    });
    all
}

/// True for the words of something that gives way.
fn gives_way(what: &str) -> bool {
    crate::plan::GIVES_WAY.contains(&what)
}
