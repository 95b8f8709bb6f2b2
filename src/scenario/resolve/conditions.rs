//! What an action waits for: `"hall layer temperature > 300 °C"`.

use super::super::fault::{Fault, code};
use super::super::fields::Of;
use super::super::names;
use super::super::read::{Located, Values};
use super::Resolver;
use crate::plan::{Room, RoomId, Watched};
use crate::units::{self, Dimension};
use std::ops::Range;

/// What a condition looks at, as written.
pub(in super::super) const LAYER_TEMPERATURE: &str = "layer temperature";
/// As [`LAYER_TEMPERATURE`].
pub(in super::super) const SMOKE_LEVEL: &str = "smoke level";
/// As [`LAYER_TEMPERATURE`].
pub(in super::super) const OXYGEN: &str = "oxygen";
/// As [`LAYER_TEMPERATURE`].
pub(in super::super) const HEAT_RELEASE: &str = "heat release";

const WORDS: [(&str, Dimension); 4] = [
    (LAYER_TEMPERATURE, Dimension::Temperature),
    (SMOKE_LEVEL, Dimension::Length),
    (OXYGEN, Dimension::Ratio),
    (HEAT_RELEASE, Dimension::Power),
];

/// A condition: what is watched, whether from below, and the level in SI.
#[derive(Debug, Clone, Copy)]
pub(super) struct Condition {
    pub(super) watched: Watched,
    pub(super) rising: bool,
    pub(super) level: f64,
}

impl Resolver<'_> {
    /// The condition of an action's `when`; `None` after a fault.
    pub(super) fn condition(&mut self, values: &Values, rooms: &[Room]) -> Option<Condition> {
        let whole = values.name("when")?;
        let text = whole.value.as_str();
        let Some(at) = text.rfind(['<', '>']) else {
            self.note(
                Fault::error(
                    code::WRONG_KIND,
                    whole.span,
                    "a condition compares with `>` or `<`",
                )
                .help("write it like `when = \"hall layer temperature > 300 °C\"`"),
            );
            return None;
        };
        let (left, right) = (&text[..at], &text[at + 1..]);
        let word = WORDS
            .iter()
            .find(|(word, _)| left.trim_end().ends_with(word));
        let Some((word, dimension)) = word else {
            let span = part(&whole, 0..left.trim_end().len());
            let known = WORDS.iter().map(|(word, _)| *word);
            let tail: Vec<&str> = left.split_whitespace().rev().take(2).collect();
            let tail: Vec<&str> = tail.into_iter().rev().collect();
            let help = names::suggestion(&tail.join(" "), "quantity", known);
            self.note(
                Fault::error(
                    code::UNKNOWN_NAME,
                    span,
                    format!("`when` cannot look at \"{}\"", left.trim()),
                )
                .label("not known here")
                .help(help),
            );
            return None;
        };
        let blank = right.len() - right.trim_start().len();
        let level = self.level(&whole, at + 1 + blank..text.len(), right, *dimension);
        let room = left.trim_end().strip_suffix(word).unwrap_or_default();
        let watched = self.watched(&whole, word, room, rooms);
        let condition = Condition {
            watched: watched?,
            rising: text[at..].starts_with('>'),
            level: level?,
        };
        self.can_come_true(&whole, &condition, rooms);
        Some(condition)
    }

    fn level(
        &mut self,
        whole: &Located<String>,
        place: Range<usize>,
        text: &str,
        dimension: Dimension,
    ) -> Option<f64> {
        match units::read(text, dimension) {
            Ok(level) => Some(level),
            Err(error) => {
                let span = part(whole, place);
                self.note(
                    Fault::error(code::UNIT, span, format!("`when`: {error}")).help(error.help()),
                );
                None
            }
        }
    }

    fn watched(
        &mut self,
        whole: &Located<String>,
        word: &str,
        room: &str,
        rooms: &[Room],
    ) -> Option<Watched> {
        let start = room.len() - room.trim_start().len();
        let name = room.trim();
        let span = part(whole, start..start + name.len());
        if word == HEAT_RELEASE {
            if !name.is_empty() {
                self.note(
                    Fault::error(
                        code::CONTRADICTION,
                        span,
                        "heat release is that of the whole building",
                    )
                    .help("write it without a room: `when = \"heat release > 1 MW\"`"),
                );
                return None;
            }
            return Some(Watched::HeatRelease);
        }
        let found = rooms.iter().position(|room| room.name.trim() == name);
        let Some(index) = found else {
            let known = self.room_names();
            let name = Located {
                value: name.to_owned(),
                span,
                given: true,
            };
            self.unknown(Of::Room, &name, &known);
            return None;
        };
        let room = RoomId(index);
        Some(match word {
            LAYER_TEMPERATURE => Watched::UpperTemperature(room),
            SMOKE_LEVEL => Watched::Interface(room),
            _ => Watched::UpperOxygen(room),
        })
    }

    /// A level that is passed at ignition already would be no condition.
    fn can_come_true(&mut self, whole: &Located<String>, condition: &Condition, rooms: &[Room]) {
        let start = match condition.watched {
            Watched::UpperTemperature(room) => rooms[room.0].temperature,
            Watched::Interface(room) => rooms[room.0].height,
            Watched::UpperOxygen(_) => 0.209,
            Watched::HeatRelease | Watched::PaneRise(_) => 0.0,
        };
        let passed = if condition.rising {
            start >= condition.level
        } else {
            start <= condition.level
        };
        if passed {
            self.note(
                Fault::caution(
                    whole.span.clone(),
                    "this condition is true from the start: the action is done at once",
                )
                .help("check `>` and `<`, or write `at` or `not_before`"),
            );
        }
    }
}

/// Place of a part of a text value: inside its quotes, unless escapes move it.
fn part(whole: &Located<String>, range: Range<usize>) -> Range<usize> {
    let plain = whole.span.len() == whole.value.len() + 2;
    if plain && !range.is_empty() {
        let start = whole.span.start + 1;
        start + range.start..start + range.end
    } else {
        whole.span.clone()
    }
}
