//! One action: what it does, and when.

use super::super::fault::{Fault, code};
use super::super::fields::Of;
use super::super::names;
use super::super::read::{Located, Opened, Sheet, Values};
use super::{Resolver, same_name, unwanted, wanted};
use crate::plan::{Action, Effect, FanId, Opening, OpeningId, OpeningKind, Room, Trigger};
use crate::units::{Dimension, rounded};
use std::ops::Range;

/// What one action says it does.
const VERBS: [&str; 5] = ["open", "shut", "set", "start", "stop"];

/// When an action is done.
#[derive(Debug, Clone)]
pub(super) enum Done {
    /// At a time.
    At(Action),
    /// When something comes true.
    When(Trigger),
}

/// An action with its place, for faults of a whole schedule.
#[derive(Debug, Clone)]
pub(super) struct Placed {
    pub(super) done: Done,
    pub(super) span: Range<usize>,
}

impl Placed {
    pub(super) fn name(&self) -> &str {
        match &self.done {
            Done::At(action) => &action.name,
            Done::When(trigger) => &trigger.name,
        }
    }
}

impl Resolver<'_> {
    /// Actions of a list, with names that differ.
    pub(super) fn placed(
        &mut self,
        list: &[Values],
        openings: &[Opening],
        rooms: &[Room],
    ) -> Vec<Placed> {
        let mut placed: Vec<Placed> = Vec::new();
        for values in list {
            let Some(done) = self.action(values, openings, rooms) else {
                continue;
            };
            let now = Placed {
                done,
                span: values.span(if values.has("at") { "at" } else { "when" }),
            };
            let plain = names::plain(now.name());
            let first = placed
                .iter()
                .find(|other| names::plain(other.name()) == plain);
            if let Some(first) = first {
                let span = values.span("name");
                let fault = same_name("action", first.name(), now.name(), span);
                self.note(fault);
            }
            placed.push(now);
        }
        placed
    }

    fn action(&mut self, values: &Values, openings: &[Opening], rooms: &[Room]) -> Option<Done> {
        let verbs: Vec<&str> = VERBS.into_iter().filter(|verb| values.has(verb)).collect();
        let [verb] = verbs[..] else {
            self.verbs(values, &verbs);
            return None;
        };
        self.moment_of(values);
        let time = values.number("at");
        self.within_run(values, time);
        let effect = self.effect(values, verb, openings);
        let condition = if values.has("when") && !values.has("at") {
            self.condition(values, rooms)
        } else {
            None
        };
        let (effect, what) = effect?;
        let name = values.text("name")?.to_owned();
        let over = values.number("over")?;
        let because = values.text("because").map(str::to_owned);
        if let Some(time) = time {
            return Some(Done::At(Action {
                name,
                time,
                over,
                effect,
                what,
                because,
            }));
        }
        let condition = condition?;
        Some(Done::When(Trigger {
            name,
            watched: condition.watched,
            rising: condition.rising,
            level: condition.level,
            not_before: values.number("not_before").unwrap_or(0.0),
            delay: values.number("delay").unwrap_or(0.0),
            over,
            effect,
            only_widens: false,
            what,
            because,
        }))
    }

    /// An action is done at a time or when something comes true.
    fn moment_of(&mut self, values: &Values) {
        if !values.has("at") && !values.has("when") {
            let because = "an action has a time or a condition";
            self.note(wanted(values, "at", because));
        }
        if values.has("at") {
            for key in ["when", "not_before", "delay"] {
                if values.has(key) {
                    self.note(unwanted(values, key, "`at` is the time itself"));
                }
            }
        }
    }

    /// What is changed, and the words for it.
    fn effect(
        &mut self,
        values: &Values,
        verb: &str,
        openings: &[Opening],
    ) -> Option<(Effect, String)> {
        let name = values.name(verb);
        if verb == "start" || verb == "stop" {
            if values.has("to") {
                self.note(unwanted(values, "to", "a fan has no position"));
            }
            let fan: FanId = self.fan_id(&name?)?;
            let running = verb == "start";
            return Some((Effect::Fan { fan, running }, verb.to_owned()));
        }
        let opening = name.and_then(|name| self.movable(&name, openings));
        let opened = self.target(values, verb)?;
        let opening = opening?;
        let width = self.clear_width(&opened, openings[opening.0].width)?;
        Some((Effect::ClearWidth { opening, width }, opened.value.text))
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
            .help("say what is done: `open = \"front_door\"`, `shut = ...`, `set = ...` with `to = \"hand's width\"`, or `start`, `stop` a fan"),
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

    /// Index of an opening by name; a fault when there is none.
    pub(super) fn opening_id(
        &mut self,
        name: &Located<String>,
        openings: &[Opening],
    ) -> Option<OpeningId> {
        let index = openings
            .iter()
            .position(|opening| opening.name == name.value);
        if index.is_none() {
            let sheet: &Sheet = self.sheet;
            let known: Vec<&str> = sheet
                .openings
                .iter()
                .map(|opening| opening.name.value.as_str())
                .collect();
            self.unknown(Of::Opening, name, &known);
        }
        index.map(OpeningId)
    }

    /// An opening that can be moved.
    pub(super) fn movable(
        &mut self,
        name: &Located<String>,
        openings: &[Opening],
    ) -> Option<OpeningId> {
        let id = self.opening_id(name, openings)?;
        let (what, help) = match openings[id.0].kind {
            OpeningKind::Gap => (
                "a gap",
                "give the opening kind = \"door\" or kind = \"window\"",
            ),
            OpeningKind::Stair => ("a stair", "put a door or hatch at its foot or head"),
            OpeningKind::Division => ("a division", "put a door there"),
            OpeningKind::Door | OpeningKind::Window | OpeningKind::Hatch => return Some(id),
        };
        self.note(
            Fault::error(
                code::ACTION,
                name.span.clone(),
                format!("\"{}\" is {what} and cannot be moved", name.value),
            )
            .help(help),
        );
        None
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
}
