//! Openings, glass, fans and what is done to them.

use super::super::fields::OPEN_AIR_NAME;
use super::super::resolve::{HEAT_RELEASE, LAYER_TEMPERATURE, OXYGEN, SMOKE_LEVEL};
use super::{Writer, quantity, quoted};
use crate::catalogue::catalogue;
use crate::plan::{
    Action, Effect, Fan, FanKind, GIVES_WAY, Opening, OpeningId, OpeningKind, Pane, Plan, Space,
    Trigger, Watched,
};
use crate::units::{Dimension, read, write};

impl Writer {
    pub(super) fn opening(&mut self, opening: &Opening, id: OpeningId, plan: &Plan) {
        self.table("opening", Some(&opening.name));
        let kind = match opening.kind {
            OpeningKind::Door => "door",
            OpeningKind::Window => "window",
            OpeningKind::Gap => "gap",
            OpeningKind::Hatch => "hatch",
            OpeningKind::Stair => "stair",
            OpeningKind::Division => "division",
        };
        self.text("kind", kind);
        let sides = [opening.from, opening.to].map(|side| match side {
            Space::Room(id) => quoted(&plan.rooms[id.0].name),
            Space::OpenAir => quoted(OPEN_AIR_NAME),
        });
        self.line(&format!("between = [{}, {}]", sides[0], sides[1]));
        self.outline(opening);
        self.quantity("gap", opening.gap_area, Dimension::Area);
        self.quantity("coefficient", opening.coefficient, Dimension::Ratio);
        self.quantity("gap_coefficient", opening.gap_coefficient, Dimension::Ratio);
        if [opening.from, opening.to].contains(&Space::OpenAir) {
            self.quantity("wind_pressure", opening.wind_pressure, Dimension::Pressure);
        }
        if let Some(pane) = &opening.pane {
            self.text("glass", &pane.name);
        }
        match opening.kind {
            OpeningKind::Window => self.gives_way("falls_out", opening, id, plan),
            OpeningKind::Door => self.gives_way("fails", opening, id, plan),
            _ => {}
        }
        self.place(opening.at);
    }

    fn outline(&mut self, opening: &Opening) {
        match opening.kind {
            OpeningKind::Hatch | OpeningKind::Stair => {
                self.quantity("area", opening.area, Dimension::Area);
                self.length("width", opening.width);
                self.quantity("exchange_factor", opening.exchange_factor, Dimension::Ratio);
            }
            OpeningKind::Division => self.length("width", opening.width),
            _ => {
                self.length("sill", opening.sill);
                self.length("head", opening.head);
            }
        }
        match opening.kind {
            OpeningKind::Door | OpeningKind::Window => {
                self.length("width", opening.width);
                self.length("position", opening.clear_width);
            }
            OpeningKind::Hatch => self.length("position", opening.clear_width),
            _ => {}
        }
    }

    /// When an opening gives way by itself.
    fn gives_way(&mut self, key: &str, opening: &Opening, id: OpeningId, plan: &Plan) {
        let mut parts: Vec<String> = Vec::new();
        let mut whole = None;
        let mine = |effect: &Effect| effect.opening() == Some(id);
        for trigger in plan
            .triggers
            .iter()
            .filter(|t| t.only_widens && mine(&t.effect))
        {
            let part = match trigger.watched {
                Watched::UpperTemperature(_) => {
                    format!(
                        "layer = {}",
                        quantity(trigger.level, Dimension::Temperature)
                    )
                }
                Watched::PaneRise(_) => format!(
                    "glass = {}",
                    quantity(trigger.level, Dimension::TemperatureDifference)
                ),
                _ => continue,
            };
            if whole.is_none() {
                parts.push(format!(
                    "delay = {}",
                    quantity(trigger.delay, Dimension::Time)
                ));
            }
            if !parts.contains(&part) {
                parts.push(part);
            }
            whole = Some((trigger.effect, trigger.over));
        }
        let timed = plan
            .actions
            .iter()
            .find(|a| gives_way(a) && mine(&a.effect));
        if let Some(action) = timed {
            parts.push(format!("at = {}", quantity(action.time, Dimension::Time)));
            whole = Some((action.effect, action.over));
        }
        let Some((Effect::ClearWidth { width, .. }, over)) = whole else {
            if opening.kind == OpeningKind::Window {
                self.text(key, "never");
            }
            return;
        };
        let share = quantity(share_of(width, opening.width), Dimension::Ratio);
        parts.push(format!("fraction = {share}"));
        parts.push(format!("over = {}", quantity(over, Dimension::Time)));
        self.line(&format!("{key} = {{ {} }}", parts.join(", ")));
    }

    pub(super) fn pane(&mut self, pane: &Pane) {
        self.table("glass", Some(&pane.name));
        self.length("thickness", pane.thickness);
        self.quantity("density", pane.density, Dimension::Density);
        self.quantity("heat_capacity", pane.heat_capacity, Dimension::HeatCapacity);
        self.quantity("emissivity", pane.emissivity, Dimension::Ratio);
    }

    pub(super) fn fan(&mut self, fan: &Fan, plan: &Plan) {
        self.table("fan", Some(&fan.name));
        match fan.kind {
            FanKind::PositivePressure { opening, covers } => {
                self.text("kind", "positive pressure");
                self.text("at", &plan.openings[opening.0].name);
                self.quantity("covers", covers, Dimension::Ratio);
            }
            FanKind::Duct {
                from,
                intake,
                to,
                outlet,
            } => {
                let kind = match (from, to) {
                    (_, Space::OpenAir) => "extract",
                    (Space::OpenAir, _) => "supply",
                    _ => "duct",
                };
                self.text("kind", kind);
                for (space, side, key, height) in [
                    (from, "from", "intake", intake),
                    (to, "to", "outlet", outlet),
                ] {
                    if let Space::Room(id) = space {
                        self.text(side, &plan.rooms[id.0].name);
                        self.length(key, height);
                    }
                }
            }
        }
        self.quantity("free_flow", fan.free_flow, Dimension::VolumeFlow);
        self.quantity(
            "dead_end_pressure",
            fan.dead_end_pressure,
            Dimension::Pressure,
        );
        self.line(&format!("running = {}", fan.running));
    }

    pub(super) fn action(&mut self, action: &Action, plan: &Plan) {
        if gives_way(action) {
            return;
        }
        self.line("");
        self.line("[[action]]");
        self.text("name", &action.name);
        self.quantity("at", action.time, Dimension::Time);
        self.change(action.effect, &action.what, plan);
        self.quantity("over", action.over, Dimension::Time);
        if let Some(because) = &action.because {
            self.text("because", because);
        }
    }

    pub(super) fn trigger(&mut self, trigger: &Trigger, plan: &Plan) {
        if trigger.only_widens {
            return;
        }
        self.line("");
        self.line("[[action]]");
        self.text("name", &trigger.name);
        self.text("when", &condition(trigger, plan));
        self.quantity("not_before", trigger.not_before, Dimension::Time);
        self.quantity("delay", trigger.delay, Dimension::Time);
        self.change(trigger.effect, &trigger.what, plan);
        self.quantity("over", trigger.over, Dimension::Time);
        if let Some(because) = &trigger.because {
            self.text("because", because);
        }
    }

    fn change(&mut self, effect: Effect, what: &str, plan: &Plan) {
        match effect {
            Effect::Fan { fan, .. } => self.text(what, &plan.fans[fan.0].name),
            Effect::ClearWidth { opening, width } => {
                let opening = &plan.openings[opening.0];
                match what {
                    "open" | "shut" => self.text(what, &opening.name),
                    what => {
                        self.text("set", &opening.name);
                        if reads_as(what, width, opening.width) {
                            self.text("to", what);
                        } else {
                            self.length("to", width);
                        }
                    }
                }
            }
        }
    }
}

/// Whether a position reads as this clear width without a models file.
fn reads_as(what: &str, clear: f64, width: f64) -> bool {
    match catalogue().position(what) {
        Some(position) => position.of(width) == clear,
        None => read(what, Dimension::Length).is_ok_and(|length| length == clear),
    }
}

/// What a trigger waits for, as written in `when`.
pub(in super::super) fn condition(trigger: &Trigger, plan: &Plan) -> String {
    let sign = if trigger.rising { '>' } else { '<' };
    let (room, what, dimension) = match trigger.watched {
        Watched::UpperTemperature(room) => (Some(room), LAYER_TEMPERATURE, Dimension::Temperature),
        Watched::Interface(room) => (Some(room), SMOKE_LEVEL, Dimension::Length),
        Watched::UpperOxygen(room) => (Some(room), OXYGEN, Dimension::Ratio),
        Watched::HeatRelease => (None, HEAT_RELEASE, Dimension::Power),
        Watched::PaneRise(_) => (None, "glass", Dimension::TemperatureDifference),
    };
    let room = room
        .and_then(|id| plan.rooms.get(id.0))
        .map_or_else(String::new, |room| format!("{} ", room.name));
    format!("{room}{what} {sign} {}", write(trigger.level, dimension))
}

fn gives_way(action: &Action) -> bool {
    GIVES_WAY.contains(&action.what.as_str())
}

/// The share that gives exactly this clear width again.
fn share_of(clear: f64, width: f64) -> f64 {
    let share = clear / width;
    [share, share.next_up(), share.next_down()]
        .into_iter()
        .find(|share| share * width == clear)
        .unwrap_or(share)
}
