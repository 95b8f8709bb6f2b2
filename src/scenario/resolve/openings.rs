//! Doors, windows and gaps; what all openings have.

use super::super::fault::{Fault, code};
use super::super::fields::{OPEN_AIR_NAME, Of};
use super::super::read::{Located, Named, Opened, Sheet, Values};
use super::{Resolver, UNREAD, unwanted, wanted};
use crate::plan::{Opening, OpeningKind, Pane, Room, RoomId, Space};
use crate::units::{Dimension, write};

/// Exchange through a stair over that of a square hole, from memory (1 to 5).
const STAIR_EXCHANGE: f64 = 3.0;

/// Edges (m above the floor of the first room), width (m) and plan area (m2).
pub(super) struct Outline {
    pub(super) sill: f64,
    pub(super) head: f64,
    pub(super) width: f64,
    pub(super) area: f64,
}

/// Lengths that differ by less are equal, m.
pub(super) const HAIR: f64 = 1e-9;

/// A length for people, rounded down so that it may be written as it stands.
pub(super) fn text(length: f64) -> String {
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
            Some("hatch") => OpeningKind::Hatch,
            Some("stair") => OpeningKind::Stair,
            Some("division") => OpeningKind::Division,
            _ => OpeningKind::Door,
        };
        let (from, to) = self.sides(values);
        self.keys_of(values, kind);
        let outline = match kind {
            OpeningKind::Hatch | OpeningKind::Stair => self.lying(values, kind, from, rooms),
            OpeningKind::Division => self.border(values, [from, to], rooms),
            _ => self.upright(values, kind),
        };
        let exchange = if kind == OpeningKind::Stair {
            STAIR_EXCHANGE
        } else {
            1.0
        };
        let opening = Opening {
            name: named.name.value.clone(),
            kind,
            from,
            to,
            sill: outline.sill,
            head: outline.head,
            width: outline.width,
            coefficient: values.number("coefficient").unwrap_or(UNREAD),
            clear_width: self.clear_at_start(values, kind, outline.width),
            gap_area: self.gap_area(values, kind, from, to),
            gap_coefficient: values.number("gap_coefficient").unwrap_or(UNREAD),
            at: values.two("at"),
            wind_pressure: 0.0,
            area: outline.area,
            exchange_factor: values.number("exchange_factor").unwrap_or(exchange),
            pane: self.pane(values),
        };
        if kind.is_horizontal() {
            self.lies_between(values, &opening, rooms);
        } else if kind != OpeningKind::Division {
            self.opening_fits(values, &opening, rooms);
        }
        opening
    }

    /// Keys that mean nothing for this kind of opening.
    fn keys_of(&mut self, values: &Values, kind: OpeningKind) {
        use OpeningKind::{Division, Door, Gap, Hatch, Stair, Window};
        let cases: [(&[&str], &[OpeningKind], &str); 8] = [
            (&["width"], &[Gap], "a gap is only an area"),
            (
                &["position"],
                &[Gap, Stair, Division],
                "it is always open as it is",
            ),
            (
                &["head", "sill"],
                &[Hatch, Stair],
                "it lies flat, in the ceiling of the lower room",
            ),
            (
                &["head", "sill"],
                &[Division],
                "it goes from floor to ceiling",
            ),
            (
                &["area", "exchange_factor"],
                &[Door, Window, Gap, Division],
                "only a hatch or stair has it",
            ),
            (
                &["length"],
                &[Door, Window, Gap, Stair, Division],
                "only a hatch has it",
            ),
            (
                &["glass", "falls_out"],
                &[Door, Gap, Hatch, Stair, Division],
                "only a window has it",
            ),
            (
                &["leaf", "fails"],
                &[Window, Gap, Hatch, Stair, Division],
                "only a door has it",
            ),
        ];
        for (keys, kinds, because) in cases {
            for key in keys.iter().filter(|_| kinds.contains(&kind)) {
                if values.has(key) {
                    self.note(unwanted(values, key, because));
                }
            }
        }
    }

    /// Edges and width of a door, window or gap.
    fn upright(&mut self, values: &Values, kind: OpeningKind) -> Outline {
        if kind != OpeningKind::Gap && !values.has("width") {
            let because = "a door or window has a clear width";
            self.note(wanted(values, "width", because));
        }
        if !values.has("head") {
            self.note(wanted(values, "head", "an opening has an upper edge"));
        }
        Outline {
            sill: values.number("sill").unwrap_or(0.0),
            head: values.number("head").unwrap_or(UNREAD),
            width: match kind {
                OpeningKind::Gap => 0.0,
                _ => values.number("width").unwrap_or(0.0),
            },
            area: 0.0,
        }
    }

    /// Glass of a window.
    fn pane(&mut self, values: &Values) -> Option<Pane> {
        let name = values.name("glass")?;
        self.glass(&name).map(|row| row.pane)
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

    pub(super) fn side(&mut self, name: &Located<String>) -> Option<Space> {
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

    fn clear_at_start(&mut self, values: &Values, kind: OpeningKind, width: f64) -> f64 {
        match (kind, values.opened("position")) {
            (OpeningKind::Stair | OpeningKind::Division, _) => width,
            (OpeningKind::Gap, _) | (_, None) => 0.0,
            (_, Some(opened)) => self.clear_width(&opened, width).unwrap_or(0.0),
        }
    }

    /// Clear width, m, of a position of an opening this wide.
    pub(super) fn clear_width(&mut self, opened: &Located<Opened>, width: f64) -> Option<f64> {
        let clear = match opened.value.width {
            Some(clear) => clear,
            None => self.catalogue.position(&opened.value.text)?.of(width),
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
            (None, OpeningKind::Hatch | OpeningKind::Stair | OpeningKind::Division) => "none",
        };
        self.catalogue.gap(name).unwrap_or(0.0)
    }

    fn opening_fits(&mut self, values: &Values, opening: &Opening, rooms: &[Room]) {
        let has_sill = !values.has("sill") || values.number("sill").is_some();
        let readable = values.number("head").is_some() && has_sill;
        if readable && opening.sill >= opening.head {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    values.span(if values.has("sill") { "sill" } else { "head" }),
                    format!("the sill of \"{}\" is not below its head", opening.name),
                )
                .label(format!("the head is at {}", text(opening.head)))
                .help("both are heights above the floor: head above sill"),
            );
        }
        let Space::Room(first) = opening.from else {
            return;
        };
        let level = |id: RoomId| rooms.get(id.0).map_or(0.0, |room| room.floor_level);
        for side in [opening.from, opening.to] {
            if let Space::Room(id) = side
                && self.sized(id.0)
            {
                let shift = level(first) - level(id);
                self.opening_fits_room(values, opening, &rooms[id.0], readable.then_some(shift));
            }
        }
        self.place_fits(values, &rooms[first.0], first.0);
    }

    /// `shift` is how much higher the floor of the first room lies than that of
    /// this one, m; `None` when the heights could not be read.
    fn opening_fits_room(
        &mut self,
        values: &Values,
        opening: &Opening,
        room: &Room,
        shift: Option<f64>,
    ) {
        if let Some(shift) = shift {
            if opening.head + shift > room.height + HAIR {
                let most = room.height - shift;
                self.outside_of(values, "head", opening, room, "higher than", most, shift);
            }
            if opening.sill + shift < -HAIR {
                let key = if values.has("sill") { "sill" } else { "head" };
                self.outside_of(values, key, opening, room, "lower than", -shift, shift);
            }
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

    /// An edge beyond the floor or ceiling of one of its rooms.
    #[allow(clippy::too_many_arguments)]
    fn outside_of(
        &mut self,
        values: &Values,
        key: &str,
        opening: &Opening,
        room: &Room,
        how: &str,
        limit: f64,
        shift: f64,
    ) {
        let (label, level) = if shift == 0.0 {
            (format!("the room is {} high", text(room.height)), "")
        } else {
            (
                format!(
                    "its floor lies {} {}",
                    text(shift.abs()),
                    if shift > 0.0 { "lower" } else { "higher" }
                ),
                " above the floor of the first room",
            )
        };
        let bound = if key == "head" && how == "higher than" {
            "at most"
        } else {
            "at least"
        };
        self.note(
            Fault::error(
                code::DOES_NOT_FIT,
                values.span(key),
                format!(
                    "opening \"{}\" is {how} room \"{}\"",
                    opening.name, room.name
                ),
            )
            .label(label)
            .help(format!("write {bound} \"{}\"{level}", text(limit))),
        );
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
}
