//! Actions of the base and of every tactic; the tactic that is played.

use super::super::fault::{Fault, code};
use super::super::fields::Of;
use super::super::names;
use super::super::read::{Located, Opened, Sheet, TacticSheet, Values};
use super::gives_way::GivingWay;
use super::{Resolver, same_name, unwanted, wanted};
use crate::plan::{Action, Effect, FanId, Opening, OpeningId, OpeningKind, Room, Trigger};
use crate::units::{Dimension, rounded};
use std::ops::Range;

/// What one action says it does.
const VERBS: [&str; 5] = ["open", "shut", "set", "start", "stop"];

/// When an action is done.
#[derive(Debug, Clone)]
enum Done {
    /// At a time.
    At(Action),
    /// When something comes true.
    When(Trigger),
}

/// An action with its place, for faults of a whole schedule.
#[derive(Debug, Clone)]
struct Placed {
    done: Done,
    span: Range<usize>,
}

impl Placed {
    fn name(&self) -> &str {
        match &self.done {
            Done::At(action) => &action.name,
            Done::When(trigger) => &trigger.name,
        }
    }
}

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

    /// Actions of a list, with names that differ.
    fn placed(&mut self, list: &[Values], openings: &[Opening], rooms: &[Room]) -> Vec<Placed> {
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
    fn movable(&mut self, name: &Located<String>, openings: &[Opening]) -> Option<OpeningId> {
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
