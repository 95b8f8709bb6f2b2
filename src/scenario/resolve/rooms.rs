//! Rooms and the walls they share.

use super::super::fault::{Fault, code};
use super::super::read::Sheet;
use super::{Resolver, UNREAD};
use crate::plan::{OpenAir, Room, SharedWall};
use crate::units::{Dimension, rounded};

impl Resolver<'_> {
    pub(super) fn rooms(&mut self, open_air: &OpenAir) -> Vec<Room> {
        let sheet: &Sheet = self.sheet;
        let indoors = sheet.indoors.number("temperature").unwrap_or(UNREAD);
        let mut rooms = Vec::with_capacity(sheet.rooms.len());
        for named in &sheet.rooms {
            let values = &named.values;
            let behind = match values.text("behind") {
                Some("open air") => open_air.temperature,
                Some(_) => indoors,
                None => values.number("behind").unwrap_or(UNREAD),
            };
            rooms.push(Room {
                name: named.name.value.clone(),
                width: values.number("width").unwrap_or(UNREAD),
                length: values.number("length").unwrap_or(UNREAD),
                height: values.number("height").unwrap_or(UNREAD),
                floor_level: values.number("floor_level").unwrap_or(0.0),
                temperature: values.number("temperature").unwrap_or(indoors),
                ceiling: self.lining(values, "ceiling"),
                walls: self.lining(values, "walls"),
                floor: self.lining(values, "floor"),
                behind,
            });
        }
        rooms
    }

    pub(super) fn shared_walls(&mut self, rooms: &[Room]) -> Vec<SharedWall> {
        let sheet: &Sheet = self.sheet;
        let mut walls = Vec::new();
        let mut taken = vec![0.0; rooms.len()];
        for named in &sheet.shared_walls {
            let values = &named.values;
            let names = values.names("between");
            let ids: Vec<_> = names.iter().map(|name| self.room_id(name)).collect();
            let lining = self.lining(values, "lining");
            let (Some(&Some(first)), Some(&Some(second))) = (ids.first(), ids.get(1)) else {
                continue;
            };
            if first == second {
                self.note(
                    Fault::error(
                        code::CONTRADICTION,
                        values.span("between"),
                        "a shared wall has two different rooms",
                    )
                    .help("name the rooms on both sides"),
                );
            }
            let Some(length) = values.number("length") else {
                continue;
            };
            for id in [first, second] {
                taken[id.0] += length;
                self.wall_fits(named, &rooms[id.0], id.0, length, taken[id.0]);
            }
            walls.push(SharedWall {
                name: named.name.value.clone(),
                between: [first, second],
                length,
                lining,
            });
        }
        walls
    }

    /// A shared wall is no longer than a side of each room, and all of them
    /// together no longer than its perimeter.
    fn wall_fits(
        &mut self,
        wall: &super::Named,
        room: &Room,
        index: usize,
        length: f64,
        taken: f64,
    ) {
        if !self.sized(index) {
            return;
        }
        let side = room.width.max(room.length);
        let span = wall.values.span("length");
        let text = |value| rounded(value, Dimension::Length);
        if length > side + 1e-9 {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    span,
                    format!("shared wall longer than any side of room \"{}\"", room.name),
                )
                .label(format!("longer than {}", text(side)))
                .help(format!("write at most \"{}\"", text(side))),
            );
        } else if taken > room.perimeter() + 1e-9 {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    span,
                    format!(
                        "shared walls of room \"{}\" are together longer than its walls",
                        room.name
                    ),
                )
                .label(format!("more than {} in all", text(room.perimeter()))),
            );
        }
    }

    /// Whether the sizes of a room could be read.
    pub(super) fn sized(&self, index: usize) -> bool {
        self.sheet.rooms.get(index).is_some_and(|room| {
            ["width", "length", "height"]
                .iter()
                .all(|key| room.values.number(key).is_some())
        })
    }
}
