//! The base and every tactic, and the one that is played.

use super::super::fault::{Fault, code};
use super::super::fields::Of;
use super::super::names;
use super::super::read::{Sheet, TacticSheet};
use super::Resolver;
use super::actions::{Done, Placed};
use super::gives_way::GivingWay;
use crate::plan::{Action, Effect, Opening, OpeningId, Room, Trigger};
use std::ops::Range;

/// A tactic: its actions, positions at ignition, and what does not give way.
struct Tactic {
    actions: Vec<Placed>,
    start: Vec<(OpeningId, f64)>,
    holds: Vec<OpeningId>,
}

impl Resolver<'_> {
    /// Actions that are played, and what waits for a condition. Every tactic is
    /// checked, played or not; the one that is played also sets positions at
    /// ignition.
    pub(super) fn played(
        &mut self,
        openings: &mut [Opening],
        rooms: &[Room],
        tactic: Option<&str>,
    ) -> (Vec<Action>, Vec<Trigger>) {
        let sheet: &Sheet = self.sheet;
        let giving_way = self.giving_way(openings);
        let base = self.placed(&sheet.actions, openings, rooms);
        let mut played = None;
        for tactic_sheet in &sheet.tactics {
            let read = self.tactic(tactic_sheet, &base, openings, rooms);
            let mut own = openings.to_vec();
            for (opening, clear) in &read.start {
                own[opening.0].clear_width = *clear;
            }
            self.schedule(&read.actions, &own);
            if tactic == Some(tactic_sheet.named.name.value.as_str()) {
                played = Some(read);
            }
        }
        let read = match (tactic, played) {
            (Some(_), Some(read)) => read,
            (tactic, _) => {
                match tactic {
                    Some(name) => self.no_tactic(name),
                    None => self.schedule(&base, openings),
                }
                Tactic {
                    actions: base,
                    start: Vec::new(),
                    holds: Vec::new(),
                }
            }
        };
        for (opening, clear) in &read.start {
            openings[opening.0].clear_width = *clear;
        }
        all_in_order(read, giving_way, openings)
    }

    fn no_tactic(&mut self, name: &str) {
        let known = self
            .sheet
            .tactics
            .iter()
            .map(|tactic| tactic.named.name.value.as_str());
        let help = names::suggestion(name, "tactic", known);
        self.note(
            Fault::elsewhere(
                code::UNKNOWN_NAME,
                format!("there is no tactic \"{name}\" in this scenario"),
            )
            .help(help),
        );
    }

    /// Actions, starting positions and what holds in a tactic.
    fn tactic(
        &mut self,
        tactic: &TacticSheet,
        base: &[Placed],
        openings: &[Opening],
        rooms: &[Room],
    ) -> Tactic {
        let values = &tactic.named.values;
        let own = self.placed(&tactic.actions, openings, rooms);
        let sheet: &Sheet = self.sheet;
        let known: Vec<&str> = sheet
            .actions
            .iter()
            .filter_map(|action| action.text("name"))
            .collect();
        for name in values.names("drop") {
            if !known.contains(&name.value.as_str()) {
                self.unknown(Of::Action, name, &known);
            }
        }
        let dropped = |name: &str| values.names("drop").iter().any(|drop| drop.value == name);
        let replaced = |name: &str| own.iter().any(|other| other.name() == name);
        let mut actions: Vec<Placed> = base
            .iter()
            .filter(|placed| !dropped(placed.name()) && !replaced(placed.name()))
            .cloned()
            .collect();
        actions.extend(own.iter().cloned());
        let mut start = Vec::new();
        for (name, opened) in values.starts() {
            let Some(opening) = self.movable(name, openings) else {
                continue;
            };
            if let Some(clear) = self.clear_width(opened, openings[opening.0].width) {
                start.push((opening, clear));
            }
        }
        let holds = values
            .names("holds")
            .iter()
            .filter_map(|name| self.opening_id(name, openings))
            .collect();
        let changes = ["drop", "start", "holds", "wind"];
        if tactic.actions.is_empty() && !changes.iter().any(|key| values.has(key)) {
            self.note(
                Fault::caution(
                    tactic.named.name.span.clone(),
                    format!("tactic \"{}\" changes nothing", tactic.named.name.value),
                )
                .help("give it actions, `drop`, `start`, `holds` or `wind`"),
            );
        }
        Tactic {
            actions,
            start,
            holds,
        }
    }

    /// One door makes one movement at a time, and each should change something.
    /// What waits for a condition comes at no known time and is left out.
    fn schedule(&mut self, actions: &[Placed], openings: &[Opening]) {
        let mut placed: Vec<(&Action, &Range<usize>)> = actions
            .iter()
            .filter_map(|placed| match &placed.done {
                Done::At(action) => Some((action, &placed.span)),
                Done::When(_) => None,
            })
            .collect();
        placed.sort_by(|a, b| a.0.time.total_cmp(&b.0.time));
        let waited_for: Vec<OpeningId> = actions
            .iter()
            .filter_map(|placed| match &placed.done {
                Done::When(trigger) => trigger.effect.opening(),
                Done::At(_) => None,
            })
            .collect();
        let mut moving: Vec<(f64, f64)> = openings
            .iter()
            .map(|opening| (f64::NEG_INFINITY, opening.clear_width))
            .collect();
        for (action, span) in placed {
            let Effect::ClearWidth { opening, width } = action.effect else {
                continue;
            };
            let (until, clear) = moving[opening.0];
            let name = &openings[opening.0].name;
            if action.time < until {
                self.note(
                    Fault::error(
                        code::ACTION,
                        span.clone(),
                        format!("\"{name}\" is still moving from the action before"),
                    )
                    .label(format!("until {until} s"))
                    .help("begin later, or let the movement before take less time"),
                );
            } else if width == clear && !waited_for.contains(&opening) {
                self.note(
                    Fault::caution(
                        span.clone(),
                        format!(
                            "action \"{}\" changes nothing: \"{name}\" is already {}",
                            action.name, action.what
                        ),
                    )
                    .help("take it out, or check the position before it"),
                );
            }
            moving[opening.0] = (action.time + action.over, width);
        }
    }
}

/// Actions in the order they happen, equal times in the order of the file, and
/// triggers; what gives way by itself comes after what people do. A pane that
/// falls out of a window that is open as wide by then is left out.
fn all_in_order(
    tactic: Tactic,
    giving_way: GivingWay,
    openings: &[Opening],
) -> (Vec<Action>, Vec<Trigger>) {
    let (mut actions, mut triggers) = (Vec::new(), Vec::new());
    for placed in tactic.actions {
        match placed.done {
            Done::At(action) => actions.push(action),
            Done::When(trigger) => triggers.push(trigger),
        }
    }
    actions.sort_by(|a, b| a.time.total_cmp(&b.time));
    let gives = |effect: &Effect| {
        effect
            .opening()
            .is_some_and(|id| !tactic.holds.contains(&id))
    };
    triggers.extend(giving_way.triggers.into_iter().filter(|t| gives(&t.effect)));
    for action in giving_way.actions.into_iter().filter(|a| gives(&a.effect)) {
        let Effect::ClearWidth { opening, width } = action.effect else {
            continue;
        };
        let before = actions
            .iter()
            .rev()
            .filter(|other| other.time <= action.time)
            .find_map(|other| match other.effect {
                Effect::ClearWidth { opening: id, width } if id == opening => Some(width),
                _ => None,
            });
        if width > before.unwrap_or(openings[opening.0].clear_width) {
            actions.push(action);
            actions.sort_by(|a, b| a.time.total_cmp(&b.time));
        }
    }
    (actions, triggers)
}
