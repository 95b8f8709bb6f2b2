//! Glass that falls out and doors that fail: triggers and timed changes.

use super::super::fault::{Fault, code};
use super::super::fields::Of;
use super::super::own_models;
use super::super::read::{BY_GLASS, BY_LAYER, Located, NEVER, Sheet, Value, Values};
use super::{Resolver, unwanted, wanted};
use crate::catalogue::{GlassRow, LeafRow};
use crate::plan::{
    Action, Effect, GIVES_WAY, Opening, OpeningId, OpeningKind, Space, Trigger, Watched,
};

/// How long a pane takes to come out or a door to fall in by default, s.
const OVER: f64 = 3.0;

/// What gives way by itself.
#[derive(Default)]
pub(super) struct GivingWay {
    /// At set times.
    pub(super) actions: Vec<Action>,
    /// On conditions.
    pub(super) triggers: Vec<Trigger>,
}

/// When one opening gives way.
#[derive(Debug, Clone, Copy)]
struct Rule {
    layer: Option<f64>,
    rise: Option<f64>,
    at: Option<f64>,
    fraction: f64,
    delay: f64,
    over: f64,
}

/// Defaults of the glass or leaf.
#[derive(Debug, Clone, Copy)]
struct Standard {
    layer: Option<f64>,
    rise: Option<f64>,
    fraction: f64,
    delay: f64,
}

impl Resolver<'_> {
    /// Glass by name: of the scenario first, then of the catalogue.
    pub(super) fn glass(&mut self, name: &Located<String>) -> Option<GlassRow> {
        let sheet: &Sheet = self.sheet;
        let own = sheet.glass.iter().find(|own| own.name.value == name.value);
        if let Some(own) = own {
            return Some(own_models::glass(own));
        }
        let found = self.catalogue.glass(&name.value).cloned();
        if found.is_none() {
            let rows = self
                .catalogue
                .glass
                .iter()
                .map(|row| row.pane.name.as_str());
            let known: Vec<&str> = sheet
                .glass
                .iter()
                .map(|own| own.name.value.as_str())
                .chain(rows)
                .collect();
            self.unknown(Of::Glass, name, &known);
        }
        found
    }

    fn leaf(&mut self, name: &Located<String>) -> Option<LeafRow> {
        let found = self.catalogue.leaf(&name.value).cloned();
        if found.is_none() {
            let rows = self.catalogue.leaves.iter();
            let known: Vec<&str> = rows.map(|row| row.name.as_str()).collect();
            self.unknown(Of::Leaf, name, &known);
        }
        found
    }

    /// Everything that gives way by itself, in the order of the openings.
    pub(super) fn giving_way(&mut self, openings: &[Opening]) -> GivingWay {
        let sheet: &Sheet = self.sheet;
        let mut all = GivingWay::default();
        for (index, (named, opening)) in sheet.openings.iter().zip(openings).enumerate() {
            let values = &named.values;
            let (key, words) = match opening.kind {
                OpeningKind::Window => ("falls_out", GIVES_WAY[0]),
                OpeningKind::Door => ("fails", GIVES_WAY[1]),
                _ => continue,
            };
            let standard = match opening.kind {
                OpeningKind::Window => values.name("glass").and_then(|name| {
                    // Its fault was noted with the pane.
                    let known = self.is_glass(&name.value);
                    known
                        .then(|| self.glass(&name))
                        .flatten()
                        .map(|row| Standard {
                            layer: Some(row.layer),
                            rise: Some(row.rise),
                            fraction: row.fraction,
                            delay: row.delay,
                        })
                }),
                _ => values
                    .name("leaf")
                    .and_then(|name| self.leaf(&name))
                    .map(|row| Standard {
                        layer: Some(row.layer),
                        rise: None,
                        fraction: row.fraction,
                        delay: row.delay,
                    }),
            };
            if let Some(rule) = self.rule(values, key, standard) {
                add(&mut all, opening, OpeningId(index), rule, words);
                self.within_run_at(values, key, rule.at);
            }
        }
        all
    }

    fn is_glass(&self, name: &str) -> bool {
        self.catalogue.glass(name).is_some()
            || self.sheet.glass.iter().any(|own| own.name.value == name)
    }

    /// When it gives way by its own keys over the defaults; `None` for never.
    fn rule(&mut self, values: &Values, key: &str, standard: Option<Standard>) -> Option<Rule> {
        let blank = Standard {
            layer: None,
            rise: None,
            fraction: 1.0,
            delay: 0.0,
        };
        let of = standard.unwrap_or(blank);
        let plain = Rule {
            layer: None,
            rise: None,
            at: None,
            fraction: of.fraction,
            delay: of.delay,
            over: OVER,
        };
        let by_layer = Rule {
            layer: of.layer,
            ..plain
        };
        let Some(found) = values.get(key) else {
            return (!values.has(key) && standard.is_some()).then_some(by_layer);
        };
        let rule = match &found.value {
            Value::Text(word) if word == NEVER => return None,
            Value::Text(word) if word == BY_LAYER => by_layer,
            Value::Text(word) if word == BY_GLASS => Rule {
                rise: of.rise,
                ..plain
            },
            _ => {
                let own = values.inner(key)?;
                let rise = own.table.field("glass").and_then(|_| own.number("glass"));
                let stated = own.has("layer") || own.has("at") || rise.is_some();
                Rule {
                    layer: own.number("layer").or(of.layer.filter(|_| !stated)),
                    rise,
                    at: own.number("at"),
                    fraction: own.number("fraction").unwrap_or(of.fraction),
                    delay: own.number("delay").unwrap_or(of.delay),
                    over: own.number("over").unwrap_or(OVER),
                }
            }
        };
        self.rule_holds(values, key, &rule);
        Some(rule)
    }

    /// A rule needs a level, and heat on a pane needs a pane.
    fn rule_holds(&mut self, values: &Values, key: &str, rule: &Rule) {
        let (what, example) = if key == "fails" {
            ("leaf", "hollow")
        } else {
            ("glass", "double")
        };
        let nothing = rule.layer.is_none() && rule.rise.is_none() && rule.at.is_none();
        let bare = rule.rise.is_some() && !values.has("glass");
        if (nothing || bare) && !values.has(what) {
            let because = if bare {
                "its temperature is followed"
            } else {
                "nothing else says when it gives way"
            };
            self.note(wanted(values, what, because).help(format!(
                "write `{what} = \"{example}\"`, or state when in `{key}`"
            )));
        }
        if let Some(own) = values.inner(key)
            && rule.at.is_some()
            && rule.layer.is_none()
            && rule.rise.is_none()
            && own.has("delay")
        {
            self.note(unwanted(own, "delay", "`at` is the time itself"));
        }
    }

    fn within_run_at(&mut self, values: &Values, key: &str, at: Option<f64>) {
        let (Some(at), Some(end)) = (at, self.sheet.root.number("duration")) else {
            return;
        };
        if at > end {
            self.note(
                Fault::error(
                    code::ACTION,
                    values.span(key),
                    "it gives way after the end of the run",
                )
                .help("set an earlier time, or make `duration` longer"),
            );
        }
    }
}

fn add(all: &mut GivingWay, opening: &Opening, id: OpeningId, rule: Rule, words: &str) {
    let effect = Effect::ClearWidth {
        opening: id,
        width: rule.fraction * opening.width,
    };
    let name = format!("{} {words}", opening.name);
    if let Some(time) = rule.at {
        all.actions.push(Action {
            name: name.clone(),
            time,
            over: rule.over,
            effect,
            what: words.to_owned(),
            because: None,
        });
    }
    let rooms = [opening.from, opening.to]
        .into_iter()
        .filter_map(|side| match side {
            Space::Room(room) => Some(room),
            Space::OpenAir => None,
        });
    let layers = rooms.filter_map(|room| Some((Watched::UpperTemperature(room), rule.layer?)));
    let panes = rule.rise.map(|rise| (Watched::PaneRise(id), rise));
    for (watched, level) in layers.chain(panes) {
        all.triggers.push(Trigger {
            name: name.clone(),
            watched,
            rising: true,
            level,
            not_before: 0.0,
            delay: rule.delay,
            over: rule.over,
            effect,
            only_widens: true,
            what: words.to_owned(),
            because: None,
        });
    }
}
