//! Doors, windows, gaps and leakage.

use super::super::fault::{Fault, code};
use super::super::fields::{OPEN_AIR_NAME, Of};
use super::super::names;
use super::super::read::{Located, Named, Opened, Sheet, Values};
use super::{Resolver, UNREAD, same_name, unwanted, wanted};
use crate::catalogue::catalogue;
use crate::plan::{Opening, OpeningKind, Room, Space};
use crate::units::{Dimension, write};

/// Most openings, gaps of leakage included.
const MOST_OPENINGS: usize = 400;
/// Lengths that differ by less are equal, m.
const HAIR: f64 = 1e-9;

/// A length for people, rounded down so that it may be written as it stands.
fn text(length: f64) -> String {
    write((length * 1000.0 + HAIR).floor() / 1000.0, Dimension::Length)
}

impl Resolver<'_> {
    pub(super) fn openings(&mut self, rooms: &[Room]) -> Vec<Opening> {
        let sheet: &Sheet = self.sheet;
        sheet
            .openings
            .iter()
            .map(|named| self.opening(named, rooms))
            .collect()
    }

    fn opening(&mut self, named: &Named, rooms: &[Room]) -> Opening {
        let values = &named.values;
        let kind = match values.text("kind") {
            Some("window") => OpeningKind::Window,
            Some("gap") => OpeningKind::Gap,
            _ => OpeningKind::Door,
        };
        let (from, to) = self.sides(values);
        let width = self.opening_width(values, kind);
        let opening = Opening {
            name: named.name.value.clone(),
            kind,
            from,
            to,
            sill: values.number("sill").unwrap_or(0.0),
            head: values.number("head").unwrap_or(UNREAD),
            width: width.unwrap_or(0.0),
            coefficient: values.number("coefficient").unwrap_or(UNREAD),
            clear_width: self.clear_at_start(values, kind, width),
            gap_area: self.gap_area(values, kind, from, to),
            gap_coefficient: values.number("gap_coefficient").unwrap_or(UNREAD),
            at: values.two("at"),
        };
        self.opening_fits(values, &opening, rooms);
        opening
    }

    /// Both sides; the open air stands in for what could not be read.
    fn sides(&mut self, values: &Values) -> (Space, Space) {
        let names = values.names("between");
        let sides: Vec<Option<Space>> = names.iter().map(|name| self.side(name)).collect();
        match sides.as_slice() {
            [Some(first), Some(second)] => {
                if first == second {
                    self.note(
                        Fault::error(
                            code::CONTRADICTION,
                            values.span("between"),
                            "an opening has two different sides",
                        )
                        .help("name the room on each side, or \"open air\""),
                    );
                } else if *first == Space::OpenAir {
                    self.note(
                        Fault::error(
                            code::CONTRADICTION,
                            values.span("between"),
                            "the room comes first: heights are counted from its floor",
                        )
                        .help(format!(
                            "write [\"{}\", \"{OPEN_AIR_NAME}\"]",
                            names[1].value
                        )),
                    );
                }
                (*first, *second)
            }
            _ => (Space::OpenAir, Space::OpenAir),
        }
    }

    fn side(&mut self, name: &Located<String>) -> Option<Space> {
        if name.value == OPEN_AIR_NAME {
            return Some(Space::OpenAir);
        }
        let index = self
            .sheet
            .rooms
            .iter()
            .position(|room| room.name.value == name.value);
        if let Some(index) = index {
            return Some(Space::Room(crate::plan::RoomId(index)));
        }
        let mut known = self.room_names();
        known.push(OPEN_AIR_NAME);
        self.unknown(Of::Room, name, &known);
        None
    }

    fn opening_width(&mut self, values: &Values, kind: OpeningKind) -> Option<f64> {
        if kind == OpeningKind::Gap {
            for key in ["width", "position"] {
                if values.has(key) {
                    self.note(unwanted(values, key, "a gap is only an area"));
                }
            }
            return None;
        }
        if !values.has("width") {
            self.note(wanted(
                values,
                "width",
                "a door or window has a clear width",
            ));
        }
        values.number("width")
    }

    fn clear_at_start(&mut self, values: &Values, kind: OpeningKind, width: Option<f64>) -> f64 {
        match (kind, width, values.opened("position")) {
            (OpeningKind::Door | OpeningKind::Window, Some(width), Some(opened)) => {
                self.clear_width(&opened, width).unwrap_or(0.0)
            }
            _ => 0.0,
        }
    }

    /// Clear width, m, of a position of an opening this wide.
    pub(super) fn clear_width(&mut self, opened: &Located<Opened>, width: f64) -> Option<f64> {
        let clear = match opened.value.width {
            Some(clear) => clear,
            None => catalogue().position(&opened.value.text)?.of(width),
        };
        if clear > width + HAIR {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    opened.span.clone(),
                    format!("\"{}\" is wider than the opening", opened.value.text),
                )
                .label(format!("the opening is {} wide", text(width)))
                .help(format!("write at most \"{}\", or \"open\"", text(width))),
            );
            return None;
        }
        Some(clear)
    }

    fn gap_area(&mut self, values: &Values, kind: OpeningKind, from: Space, to: Space) -> f64 {
        if let Some(area) = values.number("gap") {
            return area;
        }
        let outside = from == Space::OpenAir || to == Space::OpenAir;
        let name = match (values.text("gap"), kind) {
            (Some(name), _) => name,
            (None, OpeningKind::Gap) => {
                if !values.has("gap") {
                    self.note(wanted(values, "gap", "a gap is an area"));
                }
                "none"
            }
            (None, OpeningKind::Window) => "window",
            (None, OpeningKind::Door) if outside => "front door",
            (None, OpeningKind::Door) => "interior door",
        };
        catalogue().gap(name).unwrap_or(0.0)
    }

    fn opening_fits(&mut self, values: &Values, opening: &Opening, rooms: &[Room]) {
        let readable = values.number("head").is_some() && values.number("sill").is_some();
        if readable && opening.sill >= opening.head {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    values.span("sill"),
                    format!("the sill of \"{}\" is not below its head", opening.name),
                )
                .label(format!("the head is at {}", text(opening.head)))
                .help("both are heights above the floor: head above sill"),
            );
        }
        for side in [opening.from, opening.to] {
            if let Space::Room(id) = side
                && self.sized(id.0)
            {
                self.opening_fits_room(values, opening, &rooms[id.0], readable);
            }
        }
        if let Space::Room(id) = opening.from {
            self.place_fits(values, &rooms[id.0], id.0);
        }
    }

    fn opening_fits_room(
        &mut self,
        values: &Values,
        opening: &Opening,
        room: &Room,
        readable: bool,
    ) {
        if readable && opening.head > room.height + HAIR {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    values.span("head"),
                    format!(
                        "opening \"{}\" is higher than room \"{}\"",
                        opening.name, room.name
                    ),
                )
                .label(format!("the room is {} high", text(room.height)))
                .help(format!("write at most \"{}\"", text(room.height))),
            );
        }
        let side = room.width.max(room.length);
        if opening.width > side + HAIR {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    values.span("width"),
                    format!(
                        "opening \"{}\" is wider than any wall of room \"{}\"",
                        opening.name, room.name
                    ),
                )
                .label(format!("its longest wall is {}", text(side)))
                .help(format!("write at most \"{}\"", text(side))),
            );
        }
    }

    /// A place lies inside its room.
    pub(super) fn place_fits(&mut self, values: &Values, room: &Room, index: usize) {
        let Some([along, across]) = values.two("at") else {
            return;
        };
        if self.sized(index) && (along > room.width + HAIR || across > room.length + HAIR) {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    values.span("at"),
                    format!("this place lies outside room \"{}\"", room.name),
                )
                .label(format!(
                    "the room is {} by {}",
                    text(room.width),
                    text(room.length)
                ))
                .help("the first number is along the room's width, the second along its length"),
            );
        }
    }

    /// One gap over the full height of each room, by its share of the floor.
    pub(super) fn leakage(&mut self, rooms: &[Room]) -> Vec<Opening> {
        let sheet: &Sheet = self.sheet;
        let mut leaks = Vec::new();
        for named in &sheet.leakages {
            let values = &named.values;
            let to = values.name("to").and_then(|name| self.side(&name));
            let ids: Vec<_> = values
                .names("rooms")
                .iter()
                .filter_map(|name| self.room_id(name).map(|id| (id, name)))
                .collect();
            let floor: f64 = ids.iter().map(|(id, _)| rooms[id.0].floor_area()).sum();
            for (index, (id, name)) in ids.iter().enumerate() {
                let (room, from) = (&rooms[id.0], Space::Room(*id));
                if ids[..index].iter().any(|(other, _)| other == id) {
                    self.note(same_name(
                        "room",
                        &name.value,
                        &name.value,
                        name.span.clone(),
                    ));
                }
                if to == Some(from) {
                    self.note(
                        Fault::error(
                            code::CONTRADICTION,
                            name.span.clone(),
                            "a room cannot leak into itself",
                        )
                        .help("take it out of `rooms`, or change `to`"),
                    );
                }
                leaks.push(Opening {
                    name: format!("{} in {}", named.name.value, room.name),
                    kind: OpeningKind::Gap,
                    from,
                    to: to.unwrap_or(Space::OpenAir),
                    sill: 0.0,
                    head: room.height,
                    width: 0.0,
                    coefficient: 0.7,
                    clear_width: 0.0,
                    gap_area: values.number("area").unwrap_or(0.0) * room.floor_area() / floor,
                    gap_coefficient: values.number("coefficient").unwrap_or(UNREAD),
                    at: None,
                });
            }
        }
        leaks
    }

    /// A gap made from leakage must not meet an opening of the same name, and
    /// all of them together must not be too many.
    pub(super) fn same_opening_names(&mut self, openings: &[Opening]) {
        let sheet: &Sheet = self.sheet;
        let told: Vec<String> = openings
            .iter()
            .map(|opening| names::plain(&opening.name))
            .collect();
        for (index, opening) in openings.iter().enumerate().skip(sheet.openings.len()) {
            if let Some(first) = told[..index].iter().position(|name| *name == told[index]) {
                let span = sheet
                    .leakages
                    .iter()
                    .find(|leak| opening.name.starts_with(&leak.name.value))
                    .map_or(0..0, |leak| leak.name.span.clone());
                let fault = same_name("opening", &openings[first].name, &opening.name, span);
                self.note(fault);
            }
        }
        if openings.len() > MOST_OPENINGS {
            self.note(Fault::elsewhere(
                code::TOO_MUCH,
                format!(
                    "{} openings, gaps of leakage included; at most {MOST_OPENINGS} are taken",
                    openings.len()
                ),
            ));
        }
    }
}
