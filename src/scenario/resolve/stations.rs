//! Stations and their limits.

use super::super::fault::{Fault, code};
use super::super::read::{Named, Sheet};
use super::{Resolver, UNREAD, wanted};
use crate::plan::{Limits, Room, RoomId, Station};
use crate::units::{Dimension, rounded};

impl Resolver<'_> {
    pub(super) fn stations(&mut self, rooms: &[Room]) -> Vec<Station> {
        let sheet: &Sheet = self.sheet;
        sheet
            .stations
            .iter()
            .map(|named| self.station(named, rooms))
            .collect()
    }

    fn station(&mut self, named: &Named, rooms: &[Room]) -> Station {
        let values = &named.values;
        let room = values.name("room").and_then(|name| self.room_id(&name));
        if !values.has("posture") && !values.has("height") {
            let because = "a station has a posture or a height";
            self.note(wanted(values, "posture", because));
        }
        let posture = values.text("posture");
        let height = values
            .number("height")
            .or_else(|| posture.and_then(|posture| self.catalogue.posture(posture)));
        if let (Some(room), Some(height)) = (room, height) {
            self.under_ceiling(named, &rooms[room.0], room.0, height);
        }
        let limits = self.limits(named);
        Station {
            name: named.name.value.clone(),
            room: room.unwrap_or(RoomId(0)),
            height: height.unwrap_or(UNREAD),
            posture: posture.map_or_else(
                || {
                    format!(
                        "at {}",
                        rounded(height.unwrap_or(UNREAD), Dimension::Length)
                    )
                },
                str::to_owned,
            ),
            limits,
        }
    }

    fn under_ceiling(&mut self, named: &Named, room: &Room, index: usize, height: f64) {
        if self.sized(index) && height >= room.height {
            let key = if named.values.has("height") {
                "height"
            } else {
                "posture"
            };
            let high = rounded(room.height, Dimension::Length);
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    named.values.span(key),
                    format!("the head of \"{}\" is above the ceiling", named.name.value),
                )
                .label(format!("room \"{}\" is {high} high", room.name))
                .help(format!("write less than \"{high}\"")),
            );
        }
    }

    fn limits(&mut self, named: &Named) -> Limits {
        let sheet: &Sheet = self.sheet;
        let values = &named.values;
        let number = |key| {
            values
                .number(key)
                .or_else(|| sheet.limits.number(key))
                .unwrap_or(UNREAD)
        };
        let limits = Limits {
            attention_temperature: number("attention"),
            out_temperature: number("out"),
            oxygen: number("oxygen"),
            visibility: number("visibility"),
        };
        if limits.out_temperature < limits.attention_temperature {
            let own = ["out", "attention"].into_iter().find(|key| values.has(key));
            let span = own.map_or_else(|| sheet.limits.span("out"), |key| values.span(key));
            self.note(
                Fault::error(code::CONTRADICTION, span, "`out` lies below `attention`")
                    .help("people are called to attention before they are called out"),
            );
        }
        limits
    }
}
