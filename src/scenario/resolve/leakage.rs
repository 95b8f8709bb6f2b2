//! Leakage of the building, and the number of openings that come of it.

use super::super::fault::{Fault, code};
use super::super::names;
use super::super::read::{Sheet, Values};
use super::{Resolver, UNREAD, same_name, unwanted, wanted};
use crate::physics::airtightness::orifice_area;
use crate::plan::{OpenAir, Opening, OpeningKind, Room, Space};

/// Most openings, gaps of leakage included.
const MOST_OPENINGS: usize = 400;

impl Resolver<'_> {
    /// One gap over the full height of each room, by its share of the floor.
    pub(super) fn leakage(&mut self, rooms: &[Room], open_air: &OpenAir) -> Vec<Opening> {
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
            let volume: f64 = ids.iter().map(|(id, _)| rooms[id.0].volume()).sum();
            let area = self.leak_area(values, volume, open_air);
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
                    gap_area: area * room.floor_area() / floor,
                    gap_coefficient: values.number("coefficient").unwrap_or(UNREAD),
                    at: None,
                    wind_pressure: 0.0,
                    area: 0.0,
                    exchange_factor: 1.0,
                    pane: None,
                });
            }
        }
        leaks
    }

    /// Orifice area of all of a leakage: stated, or from air changes at 50 Pa.
    fn leak_area(&mut self, values: &Values, volume: f64, open_air: &OpenAir) -> f64 {
        match (values.number("area"), values.number("air_changes")) {
            (Some(area), None) => area,
            (None, Some(changes)) => {
                if values.get("coefficient").is_some_and(|found| found.given) {
                    let because = "the area of an air-tightness figure goes with 0.6";
                    self.note(unwanted(values, "coefficient", because));
                }
                orifice_area(changes, volume, super::wind::air_density(open_air))
            }
            (Some(_), Some(_)) => {
                let because = "the area is stated";
                self.note(unwanted(values, "air_changes", because));
                UNREAD
            }
            (None, None) => {
                if !values.has("area") && !values.has("air_changes") {
                    self.note(wanted(values, "area", "leakage has an area or air changes"));
                }
                UNREAD
            }
        }
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
