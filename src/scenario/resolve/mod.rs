//! Second stage: from the sheet to the plan. Names become indices, words
//! become numbers, and everything that cannot go together is a fault.

mod actions;
mod cautions;
mod conditions;
mod fans;
mod flat;
mod gives_way;
mod items;
mod leakage;
mod materials;
mod openings;
mod rooms;
mod stations;
mod tactics;
mod wind;

pub(super) use cautions::{energy, open_area, stands_open};
pub(super) use conditions::{HEAT_RELEASE, LAYER_TEMPERATURE, OXYGEN, SMOKE_LEVEL};

use super::fault::{Fault, code};
use super::fields::{KNOBS, Knob, Of};
use super::names;
use super::read::{Located, Named, Sheet, Values};
use crate::catalogue::Catalogue;
use crate::plan::{Choices, Fuel, Lining, OpenAir, PlacementRule, Plan, PlumeModel, RoomId};
use std::ops::Range;

/// Value that stands in for one that could not be read; the plan it ends up
/// in is thrown away, since a fault was noted.
const UNREAD: f64 = 1.0;

/// The sheet and the faults found so far.
struct Resolver<'a> {
    sheet: &'a Sheet,
    catalogue: &'a Catalogue,
    faults: Vec<Fault>,
}

/// Resolves a sheet; the plan counts only when no error is among the faults.
pub(super) fn resolve(
    sheet: &Sheet,
    catalogue: &Catalogue,
    tactic: Option<&str>,
) -> (Plan, Vec<Fault>) {
    let mut resolver = Resolver {
        sheet,
        catalogue,
        faults: Vec::new(),
    };
    let plan = resolver.plan(tactic);
    (plan, resolver.faults)
}

/// Fuels and linings of a user's own models file.
pub(super) fn materials(
    fuels: &[Named],
    linings: &[Named],
    faults: &mut Vec<Fault>,
) -> (Vec<Fuel>, Vec<Lining>) {
    let sheet = Sheet::of_materials(fuels, linings);
    let mut resolver = Resolver {
        sheet: &sheet,
        catalogue: crate::catalogue::catalogue(),
        faults: Vec::new(),
    };
    resolver.same_among("fuel", sheet.fuels.iter().map(|own| &own.name));
    resolver.same_among("lining", sheet.linings.iter().map(|own| &own.name));
    let own: Vec<Fuel> = sheet
        .fuels
        .iter()
        .filter_map(|named| resolver.fuel(&named.name))
        .collect();
    let linings = sheet.linings.iter().map(materials::own_lining).collect();
    faults.append(&mut resolver.faults);
    (own, linings)
}

impl<'a> Resolver<'a> {
    fn plan(&mut self, tactic: Option<&str>) -> Plan {
        self.same_names();
        let open_air = OpenAir {
            temperature: self.sheet.open_air.number("temperature").unwrap_or(UNREAD),
            humidity: self.sheet.open_air.number("humidity").unwrap_or(UNREAD),
            pressure: self.sheet.open_air.number("pressure").unwrap_or(UNREAD),
        };
        let rooms = self.rooms(&open_air);
        let shared_walls = self.shared_walls(&rooms);
        let mut openings = self.openings(&rooms);
        let (fuels, items) = self.items(&rooms);
        let stations = self.stations(&rooms);
        let fans = self.fans(&openings, &rooms);
        let (actions, triggers) = self.played(&mut openings, &rooms, tactic);
        let leaks = self.leakage(&rooms, &open_air);
        openings.extend(leaks);
        self.wind(&mut openings, &open_air, tactic);
        self.same_opening_names(&openings);
        let plan = Plan {
            title: self.sheet.root.text("title").unwrap_or_default().to_owned(),
            end: self.sheet.root.number("duration").unwrap_or(UNREAD),
            open_air,
            rooms,
            shared_walls,
            openings,
            fuels,
            items,
            stations,
            fans,
            actions,
            triggers,
            choices: self.choices(),
            tactic: tactic.map(str::to_owned),
        };
        self.cautions(&plan);
        plan
    }

    /// Notes a fault.
    fn note(&mut self, fault: Fault) {
        self.faults.push(fault);
    }

    /// Two things of one kind with one name, whatever case and joins.
    fn same_names(&mut self) {
        let sheet = self.sheet;
        if sheet.rooms.is_empty() {
            self.note(
                Fault::elsewhere(code::MISSING_KEY, "there is no room in this scenario")
                    .help("add one: [room.bedroom] with width, length and height"),
            );
        }
        let kinds: [(&str, &[Named]); 11] = [
            ("room", &sheet.rooms),
            ("lining", &sheet.linings),
            ("shared wall", &sheet.shared_walls),
            ("opening", &sheet.openings),
            ("leakage", &sheet.leakages),
            ("item", &sheet.items),
            ("fuel", &sheet.fuels),
            ("station", &sheet.stations),
            ("facade", &sheet.facades),
            ("fan", &sheet.fans),
            ("glass", &sheet.glass),
        ];
        for (what, things) in kinds {
            self.same_among(what, things.iter().map(|thing| &thing.name));
        }
        let catalogue = self.catalogue;
        let linings = catalogue.linings.iter().map(|row| row.lining.name.as_str());
        self.nearly_catalogue("lining", &sheet.linings, linings);
        let fuels = catalogue.fuels.iter().map(|row| row.fuel.name.as_str());
        self.nearly_catalogue("fuel", &sheet.fuels, fuels);
        let glass = catalogue.glass.iter().map(|row| row.pane.name.as_str());
        self.nearly_catalogue("glass", &sheet.glass, glass);
        self.same_among(
            "tactic",
            sheet.tactics.iter().map(|sheet| &sheet.named.name),
        );
        for room in &sheet.rooms {
            if names::plain(&room.name.value) == names::plain(super::fields::OPEN_AIR_NAME) {
                self.note(
                    Fault::error(
                        code::SAME_NAME,
                        room.name.span.clone(),
                        "a room cannot be called \"open air\"; that is the outside",
                    )
                    .help("give the room another name"),
                );
            }
        }
    }

    /// A name that is nearly one of the catalogue would leave two of a kind.
    fn nearly_catalogue<'n>(
        &mut self,
        what: &str,
        own: &[Named],
        catalogue: impl Iterator<Item = &'n str>,
    ) {
        for known in catalogue {
            let plain = names::plain(known);
            for named in own {
                let name = &named.name;
                if name.value != known && names::plain(&name.value) == plain {
                    let span = name.span.clone();
                    self.note(same_name(what, known, &name.value, span).help(
                        "write it exactly as in the catalogue to replace it, or give it another name",
                    ));
                }
            }
        }
    }

    fn same_among<'n>(&mut self, what: &str, all: impl Iterator<Item = &'n Located<String>>) {
        let mut seen: Vec<(String, &str)> = Vec::new();
        for name in all {
            let plain = names::plain(&name.value);
            if let Some((_, first)) = seen.iter().find(|(other, _)| *other == plain) {
                self.note(same_name(what, first, &name.value, name.span.clone()));
            }
            seen.push((plain, &name.value));
        }
    }

    /// Index of a room by name; a fault when there is none.
    fn room_id(&mut self, name: &Located<String>) -> Option<RoomId> {
        let found = self
            .sheet
            .rooms
            .iter()
            .position(|room| room.name.value == name.value);
        if found.is_none() {
            let known = self.room_names();
            self.unknown(Of::Room, name, &known);
        }
        found.map(RoomId)
    }

    fn room_names(&self) -> Vec<&'a str> {
        let sheet: &'a Sheet = self.sheet;
        sheet
            .rooms
            .iter()
            .map(|room| room.name.value.as_str())
            .collect()
    }

    fn unknown(&mut self, of: Of, name: &Located<String>, known: &[&str]) {
        self.faults.push(
            Fault::error(
                code::UNKNOWN_NAME,
                name.span.clone(),
                format!("there is no {} \"{}\"", of.words(), name.value),
            )
            .label("not known")
            .help(names::suggestion(
                &name.value,
                of.words(),
                known.iter().copied(),
            )),
        );
    }

    fn choices(&mut self) -> Choices {
        let physics = &self.sheet.physics;
        let mut choices = Choices::default();
        match physics.text("plume") {
            Some("Heskestad") => choices.plume = PlumeModel::Heskestad,
            Some("Zukoski") => choices.plume = PlumeModel::Zukoski,
            _ => choices.plume = PlumeModel::McCaffrey,
        }
        match physics.text("placement") {
            Some("image") => choices.placement = PlacementRule::Image,
            Some("none") => choices.placement = PlacementRule::None,
            _ => choices.placement = PlacementRule::Weak,
        }
        for Knob { field, set, .. } in KNOBS {
            if let Some(value) = physics.number(field.name) {
                set(&mut choices, value);
            }
        }
        self.window_of_ignition(&choices);
        choices
    }

    fn window_of_ignition(&mut self, choices: &Choices) {
        if choices.autoignition_full <= choices.autoignition_start {
            let span = self.sheet.physics.span("autoignition_full");
            self.note(
                Fault::error(
                    code::CONTRADICTION,
                    span,
                    "`autoignition_full` must lie above `autoignition_start`",
                )
                .help("the defaults are 450 °C and 600 °C"),
            );
        }
    }
}

/// The fault of two things with one name.
fn same_name(what: &str, first: &str, second: &str, span: Range<usize>) -> Fault {
    let message = if first == second {
        format!("two things are called {what} \"{first}\"")
    } else {
        format!("{what} \"{second}\" and {what} \"{first}\" differ only in case, spaces or joins")
    };
    Fault::error(code::SAME_NAME, span, message)
        .label("again here")
        .help("give one of them another name")
}

/// A value that must be there for this kind of thing.
fn wanted(values: &Values, key: &str, because: &str) -> Fault {
    let field = values.table.field(key);
    let example = field.map(super::reference::example).unwrap_or_default();
    let doc = field.map_or("", |field| field.doc);
    Fault::error(
        code::MISSING_KEY,
        values.span.clone(),
        format!("`{key}` is missing: {because}"),
    )
    .label("in this table")
    .help(format!("{doc} Write it like `{key} = {example}`"))
}

/// A value that has no meaning for this kind of thing.
fn unwanted(values: &Values, key: &str, because: &str) -> Fault {
    Fault::error(
        code::CONTRADICTION,
        values.span(key),
        format!("`{key}` has no meaning here: {because}"),
    )
    .help(format!("leave `{key}` out"))
}
