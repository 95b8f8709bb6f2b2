//! What is done, in words.

use super::super::resolved::condition;
use super::super::{Offered, hand};
use super::clock;
use crate::plan::{Effect, GIVES_WAY, Plan};
use crate::units::{Dimension, rounded};
use std::fmt::Write as _;

pub(super) fn actions(out: &mut String, plan: &Plan) {
    line!(out, "\nACTIONS");
    let by_people = |what: &str| !GIVES_WAY.contains(&what);
    let mut none = true;
    for action in plan.actions.iter().filter(|a| by_people(&a.what)) {
        none = false;
        let done = done(plan, action.effect, &action.what, action.because.as_deref());
        line!(out, "  {:>8}  {}: {done}", clock(action.time), action.name);
    }
    for trigger in plan.triggers.iter().filter(|t| !t.only_widens) {
        none = false;
        let done = done(
            plan,
            trigger.effect,
            &trigger.what,
            trigger.because.as_deref(),
        );
        let mut when = condition(trigger, plan);
        if trigger.not_before > 0.0 {
            let _ = write!(when, ", not before {}", clock(trigger.not_before));
        }
        if trigger.delay > 0.0 {
            let _ = write!(when, ", {} later", rounded(trigger.delay, Dimension::Time));
        }
        line!(out, "  when {when}  {}: {done}", trigger.name);
    }
    if none {
        line!(out, "  none");
    }
}

/// Tactics that can be played, with their notes.
pub(super) fn tactics(out: &mut String, offered: &[Offered]) {
    if offered.is_empty() {
        return;
    }
    line!(out, "\nTACTICS (play one with --tactic NAME)");
    for tactic in offered {
        let note = tactic.note.as_deref().unwrap_or("");
        let colon = if note.is_empty() { "" } else { ": " };
        line!(out, "  {}{colon}{note}", tactic.name);
    }
}

/// What a change does, in words and by hand calculation.
fn done(plan: &Plan, effect: Effect, what: &str, because: Option<&str>) -> String {
    let because = because.map_or_else(String::new, |because| format!(" ({because})"));
    match effect {
        Effect::ClearWidth { opening, width } => {
            let Some(opening) = plan.openings.get(opening.0) else {
                return String::new();
            };
            if opening.kind.is_horizontal() {
                let area = opening.area * width / opening.width;
                return format!("{} {what}{because}; {area:.2} m2", opening.name);
            }
            if width <= 0.0 {
                return format!("{} {what}{because}", opening.name);
            }
            let factor = hand::opening_factor(width, opening.head - opening.sill);
            format!(
                "{} {what}{because}; {width:.2} m clear, {:.2} MW by hand calculation",
                opening.name,
                hand::air_limit(factor) / 1e6
            )
        }
        Effect::Fan { fan, running } => {
            let fan = plan.fans.get(fan.0);
            let name = fan.map_or("", |fan| fan.name.as_str());
            let verb = if running { "starts" } else { "stops" };
            format!("{name} {verb}{because}")
        }
    }
}
