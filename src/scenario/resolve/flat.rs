//! Openings that lie flat, and the open border inside a long room.

use super::super::fault::{Fault, code};
use super::super::read::Values;
use super::openings::{HAIR, Outline, text};
use super::{Resolver, UNREAD, unwanted, wanted};
use crate::plan::{Opening, OpeningKind, Room, Space};
use crate::units::{Dimension, rounded};

/// How far a floor may lie below the ceiling under it, m.
const OVERLAP: f64 = 0.01;
/// Sides of two rooms that differ by less are one side, m.
const SAME_SIDE: f64 = 0.01;

impl Resolver<'_> {
    /// Height, width and area of a hatch or stair.
    pub(super) fn lying(
        &mut self,
        values: &Values,
        kind: OpeningKind,
        from: Space,
        rooms: &[Room],
    ) -> Outline {
        let height = match from {
            Space::Room(id) => rooms.get(id.0).map_or(UNREAD, |room| room.height),
            Space::OpenAir => UNREAD,
        };
        let (width, length) = (values.number("width"), values.number("length"));
        let area = match (values.number("area"), width, length) {
            (Some(area), ..) => {
                if values.has("length") {
                    self.note(unwanted(values, "length", "the area is stated"));
                }
                area
            }
            (None, Some(width), Some(length)) if kind == OpeningKind::Hatch => width * length,
            _ => {
                let both = values.has("width") && values.has("length");
                let because = match kind {
                    OpeningKind::Stair => Some("a stair has an opening in the floor"),
                    _ if both => None,
                    _ => Some("a hatch has an area, or width and length"),
                };
                if let Some(because) = because
                    && !values.has("area")
                {
                    self.note(wanted(values, "area", because));
                }
                UNREAD
            }
        };
        Outline {
            sill: height,
            head: height,
            width: width.unwrap_or_else(|| area.sqrt()),
            area,
        }
    }

    /// A hatch or stair leads from a room to the one above it.
    pub(super) fn lies_between(&mut self, values: &Values, opening: &Opening, rooms: &[Room]) {
        let Space::Room(low) = opening.from else {
            return;
        };
        let lower = &rooms[low.0];
        match opening.to {
            Space::OpenAir if opening.kind == OpeningKind::Stair => self.note(
                Fault::error(
                    code::CONTRADICTION,
                    values.span("between"),
                    "a stair leads from a room to the one above it",
                )
                .help("name the upper room, or write kind = \"hatch\""),
            ),
            Space::OpenAir => {}
            Space::Room(high) => {
                let upper = &rooms[high.0];
                let least = lower.floor_level + lower.height;
                let sized = self.sized(low.0) && self.sized(high.0);
                if sized && low != high && upper.floor_level < least - OVERLAP {
                    self.note(
                        Fault::error(
                            code::DOES_NOT_FIT,
                            values.span("between"),
                            format!(
                                "room \"{}\" does not lie above room \"{}\"",
                                upper.name, lower.name
                            ),
                        )
                        .label(format!("its floor is at {}", text(upper.floor_level)))
                        .help(format!(
                            "name the lower room first, and give the upper one floor_level = \"{}\" or more",
                            rounded(least, Dimension::Length)
                        )),
                    );
                }
                if self.sized(high.0) {
                    self.area_fits(values, opening, upper);
                }
            }
        }
        if self.sized(low.0) {
            self.area_fits(values, opening, lower);
            self.place_fits(values, lower, low.0);
        }
    }

    fn area_fits(&mut self, values: &Values, opening: &Opening, room: &Room) {
        if opening.area > room.floor_area() + HAIR {
            let key = if values.has("area") { "area" } else { "width" };
            let area = rounded(room.floor_area(), Dimension::Area);
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    values.span(key),
                    format!(
                        "opening \"{}\" is larger than the floor of room \"{}\"",
                        opening.name, room.name
                    ),
                )
                .label(format!("the floor has {area}")),
            );
        }
    }

    /// The open border between two parts of one long room: the smaller
    /// cross-section of the two.
    pub(super) fn border(
        &mut self,
        values: &Values,
        between: [Space; 2],
        rooms: &[Room],
    ) -> Outline {
        let [Space::Room(a), Space::Room(b)] = between else {
            if values.names("between").len() == 2 {
                self.note(
                    Fault::error(
                        code::CONTRADICTION,
                        values.span("between"),
                        "a division lies between two parts of one room",
                    )
                    .help("name two rooms"),
                );
            }
            return Outline {
                sill: 0.0,
                head: UNREAD,
                width: UNREAD,
                area: 0.0,
            };
        };
        let (first, second) = (&rooms[a.0], &rooms[b.0]);
        let step = second.floor_level - first.floor_level;
        let (sill, head) = (step.max(0.0), first.height.min(step + second.height));
        let width = values
            .number("width")
            .unwrap_or_else(|| shared_side(first, second));
        let shortest = [first, second].map(|room| room.width.max(room.length));
        let most = shortest[0].min(shortest[1]);
        if self.sized(a.0) && self.sized(b.0) {
            if width > most + HAIR {
                self.note(
                    Fault::error(
                        code::DOES_NOT_FIT,
                        values.span("width"),
                        "this division is wider than one of its rooms",
                    )
                    .help(format!("write at most \"{}\", or leave it out", text(most))),
                );
            }
            if head <= sill + HAIR {
                self.note(
                    Fault::error(
                        code::DOES_NOT_FIT,
                        values.span("between"),
                        "these two rooms have no height in common",
                    )
                    .help("check their floor_level and height"),
                );
            }
        }
        Outline {
            sill,
            head,
            width,
            area: 0.0,
        }
    }
}

/// The side that two parts of one room share: the shortest that both have, or
/// the shortest of all.
fn shared_side(first: &Room, second: &Room) -> f64 {
    let sides = [second.width, second.length];
    let shared = [first.width, first.length]
        .into_iter()
        .filter(|side| sides.iter().any(|other| (side - other).abs() < SAME_SIDE))
        .fold(f64::INFINITY, f64::min);
    if shared.is_finite() {
        return shared;
    }
    let shortest = first.width.min(first.length);
    shortest.min(second.width).min(second.length)
}
