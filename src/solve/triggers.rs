//! Changes that wait for a condition: failing glass and doors, actions with
//! `when`. Looked at on every accepted step, located on the interpolant.

use super::derivative::Model;
use super::layout::UPPER;
use crate::plan::{Effect, Trigger, Watched};
use crate::record::Fired;

/// Which triggers have fired.
#[derive(Debug, Clone)]
pub struct Triggers {
    done: Vec<bool>,
    /// What fired, by time.
    pub fired: Vec<Fired>,
}

impl Triggers {
    /// All waiting.
    pub fn new(count: usize) -> Self {
        Self {
            done: vec![false; count],
            fired: Vec::new(),
        }
    }

    /// The first waiting trigger whose level is passed in the model's last
    /// evaluation.
    pub fn passed(&self, model: &Model<'_>, time: f64, y: &[f64]) -> Option<usize> {
        let triggers = model.plan.triggers.iter().enumerate();
        triggers
            .filter(|(i, t)| !self.done[*i] && time >= t.not_before)
            .find(|(_, t)| is_passed(model, t, y))
            .map(|(i, _)| i)
    }

    /// Fires all waiting triggers whose level is passed, at this time: their
    /// changes join the schedule.
    pub fn fire(&mut self, model: &mut Model<'_>, time: f64, y: &[f64]) {
        while let Some(index) = self.passed(model, time, y) {
            self.done[index] = true;
            let trigger = &model.plan.triggers[index];
            let begin = time + trigger.delay.max(0.0);
            if is_narrower(model, trigger, begin) || begin >= model.plan.end {
                continue;
            }
            model.schedule.add(trigger.effect, begin, trigger.over);
            let place = self.fired.partition_point(|f| f.time <= begin);
            self.fired.insert(
                place,
                Fired {
                    trigger: index,
                    time: begin,
                },
            );
        }
    }
}

/// True when the trigger would close what is open wider already.
fn is_narrower(model: &Model<'_>, trigger: &Trigger, time: f64) -> bool {
    match trigger.effect {
        Effect::ClearWidth { opening, width } => {
            trigger.only_widens && width < model.schedule.clear_width(opening.0, time)
        }
        Effect::Fan { .. } => false,
    }
}

fn is_passed(model: &Model<'_>, trigger: &Trigger, y: &[f64]) -> bool {
    let value = value(model, trigger.watched, y);
    if trigger.rising {
        value >= trigger.level
    } else {
        value <= trigger.level
    }
}

fn value(model: &Model<'_>, watched: Watched, y: &[f64]) -> f64 {
    let upper = |room: usize| &model.layers.layers[2 * room + UPPER];
    match watched {
        Watched::UpperTemperature(room) => upper(room.0).temperature,
        Watched::Interface(room) => model.layers.interface[room.0],
        Watched::UpperOxygen(room) => upper(room.0).oxygen,
        Watched::HeatRelease => model.heat_released(),
        Watched::PaneRise(opening) => {
            let rooms = model.balance.passages[opening.0].rooms();
            let start = rooms[0]
                .or(rooms[1])
                .map_or(model.building.air_temperature, |r| {
                    model.building.rooms[r].start
                });
            y[model.building.layout.pane(opening.0)] - start
        }
    }
}
