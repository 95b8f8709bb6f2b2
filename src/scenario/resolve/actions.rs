//! Actions of the base and of every tactic; the tactic that is played.

use super::super::fault::{Fault, code};
use super::super::fields::Of;
use super::super::names;
use super::super::read::{Located, Opened, Sheet, TacticSheet, Values};
use super::{Resolver, same_name, unwanted, wanted};
use crate::plan::{Action, Effect, Opening, OpeningId, OpeningKind};
use crate::units::{Dimension, rounded};
use std::ops::Range;

/// An action with its place, for faults of a whole schedule.
#[derive(Clone)]
struct Placed {
    action: Action,
    span: Range<usize>,
}

impl Resolver<'_> {
    /// Actions that are played. Every tactic is checked, played or not; the
    /// one that is played also sets positions at ignition.
    pub(super) fn played(&mut self, openings: &mut [Opening], tactic: Option<&str>) -> Vec<Action> {
        let sheet: &Sheet = self.sheet;
        let base = self.placed(&sheet.actions, openings);
        let mut played = None;
        for tactic_sheet in &sheet.tactics {
            let (actions, start) = self.tactic(tactic_sheet, &base, openings);
            let mut own = openings.to_vec();
            for (opening, clear) in &start {
                own[opening.0].clear_width = *clear;
            }
            self.schedule(&actions, &own);
            if tactic == Some(tactic_sheet.named.name.value.as_str()) {
                played = Some((actions, start));
            }
        }
        match (tactic, played) {
            (Some(_), Some((actions, start))) => {
                for (opening, clear) in start {
                    openings[opening.0].clear_width = clear;
                }
                sorted(actions)
            }
            (Some(name), None) => {
                self.no_tactic(name);
                sorted(base)
            }
            (None, _) => {
                self.schedule(&base, openings);
                sorted(base)
            }
        }
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

    /// Actions of a list, with names that differ.
    fn placed(&mut self, list: &[Values], openings: &[Opening]) -> Vec<Placed> {
        let mut placed: Vec<Placed> = Vec::new();
        for values in list {
            let Some(action) = self.action(values, openings) else {
                continue;
            };
            let plain = names::plain(&action.name);
            let first = placed
                .iter()
                .find(|other| names::plain(&other.action.name) == plain);
            if let Some(first) = first {
                let span = values.span("name");
                let fault = same_name("action", &first.action.name, &action.name, span);
                self.note(fault);
            }
            placed.push(Placed {
                action,
                span: values.span("at"),
            });
        }
        placed
    }

    fn action(&mut self, values: &Values, openings: &[Opening]) -> Option<Action> {
        let verbs: Vec<&str> = ["open", "shut", "set"]
            .into_iter()
            .filter(|verb| values.has(verb))
            .collect();
        let [verb] = verbs[..] else {
            self.verbs(values, &verbs);
            return None;
        };
        let time = values.number("at");
        self.within_run(values, time);
        let opening = values
            .name(verb)
            .and_then(|name| self.movable(&name, openings));
        let opened = self.target(values, verb)?;
        let opening = opening?;
        let clear_width = self.clear_width(&opened, openings[opening.0].width)?;
        Some(Action {
            name: values.text("name")?.to_owned(),
            time: time?,
            over: values.number("over")?,
            effect: Effect::ClearWidth {
                opening,
                width: clear_width,
            },
            what: opened.value.text,
            because: values.text("because").map(str::to_owned),
        })
    }

    fn verbs(&mut self, values: &Values, verbs: &[&str]) {
        let fault = match verbs.get(1) {
            Some(second) => Fault::error(
                code::CONTRADICTION,
                values.span(second),
                "one action does one thing",
            )
            .help("write a second [[action]] for the second movement"),
            None => Fault::error(
                code::MISSING_KEY,
                values.span.clone(),
                "this action does nothing",
            )
            .label("in this table")
            .help("say what is done: `open = \"front_door\"`, `shut = ...`, or `set = ...` with `to = \"hand's width\"`"),
        };
        self.note(fault);
    }

    /// Position that an action ends at.
    fn target(&mut self, values: &Values, verb: &str) -> Option<Located<Opened>> {
        if verb == "set" {
            if !values.has("to") {
                self.note(wanted(values, "to", "`set` goes with a position"));
            }
            return values.opened("to");
        }
        if values.has("to") {
            self.note(unwanted(values, "to", "`open` and `shut` say it all"));
        }
        Some(Located {
            value: Opened {
                text: verb.to_owned(),
                width: None,
            },
            span: values.span(verb),
            given: true,
        })
    }

    /// An opening that can be moved.
    fn movable(&mut self, name: &Located<String>, openings: &[Opening]) -> Option<OpeningId> {
        let index = openings
            .iter()
            .position(|opening| opening.name == name.value);
        let Some(index) = index else {
            let sheet: &Sheet = self.sheet;
            let known: Vec<&str> = sheet
                .openings
                .iter()
                .map(|opening| opening.name.value.as_str())
                .collect();
            self.unknown(Of::Opening, name, &known);
            return None;
        };
        if openings[index].kind == OpeningKind::Gap {
            self.note(
                Fault::error(
                    code::ACTION,
                    name.span.clone(),
                    format!("\"{}\" is a gap and cannot be moved", name.value),
                )
                .help("give the opening kind = \"door\" or kind = \"window\""),
            );
            return None;
        }
        Some(OpeningId(index))
    }

    fn within_run(&mut self, values: &Values, time: Option<f64>) {
        let (Some(time), Some(end)) = (time, self.sheet.root.number("duration")) else {
            return;
        };
        if time > end {
            self.note(
                Fault::error(
                    code::ACTION,
                    values.span("at"),
                    "this action comes after the end of the run",
                )
                .label(format!("the run ends at {}", rounded(end, Dimension::Time)))
                .help("set an earlier time, or make `duration` longer"),
            );
        }
    }

    /// Actions and starting positions of a tactic.
    fn tactic(
        &mut self,
        tactic: &TacticSheet,
        base: &[Placed],
        openings: &[Opening],
    ) -> (Vec<Placed>, Vec<(OpeningId, f64)>) {
        let values = &tactic.named.values;
        let own = self.placed(&tactic.actions, openings);
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
        let replaced = |name: &str| own.iter().any(|other| other.action.name == name);
        let mut actions: Vec<Placed> = base
            .iter()
            .filter(|placed| !dropped(&placed.action.name) && !replaced(&placed.action.name))
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
        if tactic.actions.is_empty() && !values.has("drop") && !values.has("start") {
            self.note(
                Fault::caution(
                    tactic.named.name.span.clone(),
                    format!("tactic \"{}\" changes nothing", tactic.named.name.value),
                )
                .help("give it actions, `drop` or `start`"),
            );
        }
        (actions, start)
    }

    /// One door makes one movement at a time, and each should change something.
    fn schedule(&mut self, actions: &[Placed], openings: &[Opening]) {
        let mut placed: Vec<&Placed> = actions.iter().collect();
        placed.sort_by(|a, b| a.action.time.total_cmp(&b.action.time));
        let mut moving = vec![(f64::NEG_INFINITY, 0.0); openings.len()];
        for (state, opening) in moving.iter_mut().zip(openings) {
            state.1 = opening.clear_width;
        }
        for Placed { action, span } in placed {
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
            } else if width == clear {
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

/// In the order they happen; equal times in the order of the file.
fn sorted(mut placed: Vec<Placed>) -> Vec<Action> {
    placed.sort_by(|a, b| a.action.time.total_cmp(&b.action.time));
    placed.into_iter().map(|placed| placed.action).collect()
}
