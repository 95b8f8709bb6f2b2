//! What burns.

use super::super::fault::{Fault, code};
use super::super::names;
use super::super::read::{Named, Sheet, Value, Values};
use super::{Resolver, UNREAD, same_name, unwanted, wanted};
use crate::plan::{Burning, Curve, Fuel, FuelId, Item, Room, RoomId};
use crate::units::{Dimension, rounded};

impl Resolver<'_> {
    /// Fuels in the order of first use, and the items.
    pub(super) fn items(&mut self, rooms: &[Room]) -> (Vec<Fuel>, Vec<Item>) {
        let sheet: &Sheet = self.sheet;
        let mut fuels: Vec<Fuel> = Vec::new();
        let mut items = Vec::new();
        for named in &sheet.items {
            let item = self.item(named, rooms, &mut fuels);
            items.push(item);
        }
        for own in &sheet.fuels {
            let used = sheet
                .items
                .iter()
                .any(|item| item.values.text("fuel") == Some(&own.name.value))
                || sheet
                    .fuels
                    .iter()
                    .any(|other| other.values.text("like") == Some(&own.name.value));
            if !used {
                // Read all the same, so that its faults are found now.
                self.fuel(&own.name);
                self.note(
                    Fault::caution(
                        own.name.span.clone(),
                        format!("fuel \"{}\" is not used", own.name.value),
                    )
                    .help("name it in an item, or take it out"),
                );
            }
        }
        (fuels, items)
    }

    fn item(&mut self, named: &Named, rooms: &[Room], fuels: &mut Vec<Fuel>) -> Item {
        let values = &named.values;
        let room = values.name("room").and_then(|name| self.room_id(&name));
        let fuel = values
            .name("fuel")
            .and_then(|name| self.fuel(&name))
            .map(|fuel| self.item_fuel(&named.name.value, values, fuel));
        let burner = values.text("kind") == Some("burner");
        let burning = if burner {
            self.burner(values)
        } else {
            self.load(values)
        };
        if let Some(room) = room {
            self.item_fits(named, &rooms[room.0], room.0);
        }
        self.lit_in_time(values);
        if values.flag("corner") && !values.has("gap_to_wall") {
            self.note(wanted(
                values,
                "gap_to_wall",
                "a corner is at some distance",
            ));
        }
        Item {
            name: named.name.value.clone(),
            room: room.unwrap_or(RoomId(0)),
            fuel: fuel.map_or(FuelId(0), |fuel| self.place_fuel(fuels, fuel, values)),
            mass: if burner {
                f64::INFINITY
            } else {
                values.number("mass").unwrap_or(UNREAD)
            },
            burning,
            surface_height: values.number("surface_height").unwrap_or(0.0),
            gap_to_wall: values.number("gap_to_wall"),
            in_corner: values.flag("corner"),
            ignition: values.number("starts").unwrap_or(0.0),
            at: values.two("at"),
        }
    }

    fn burner(&mut self, values: &Values) -> Burning {
        for key in ["mass", "growth", "peak", "burns"] {
            if values.has(key) {
                self.note(unwanted(values, key, "a burner has a fixed flow"));
            }
        }
        for key in ["rate", "side"] {
            if !values.has(key) {
                self.note(wanted(values, key, "a burner needs it"));
            }
        }
        let number = |key| values.number(key).unwrap_or(UNREAD);
        Burning::Burner {
            rate: number("rate"),
            ramp: number("ramp"),
            side: number("side"),
        }
    }

    fn load(&mut self, values: &Values) -> Burning {
        for key in ["rate", "side", "ramp"] {
            if values.has(key) {
                self.note(unwanted(values, key, "only a burner has it"));
            }
        }
        for key in ["mass", "growth"] {
            if !values.has(key) {
                self.note(wanted(values, key, "a load needs it"));
            }
        }
        let curve = match values.get("growth").map(|found| &found.value) {
            Some(Value::Rates(rates)) => {
                if values.has("peak") {
                    let because = "the list of heat release has its own peak";
                    self.note(unwanted(values, "peak", because));
                }
                Curve::Table(rates.clone())
            }
            growth => {
                if !values.has("peak") && growth.is_some() {
                    self.note(wanted(values, "peak", "growth goes on up to it"));
                }
                Curve::Growth {
                    alpha: values.number("growth").unwrap_or(UNREAD),
                    peak: values.number("peak").unwrap_or(UNREAD),
                }
            }
        };
        if values.text("burns") == Some("as given") {
            Burning::AsGiven(curve)
        } else {
            Burning::Growing(curve)
        }
    }

    fn item_fits(&mut self, named: &Named, room: &Room, index: usize) {
        let values = &named.values;
        self.place_fits(values, room, index);
        if !self.sized(index) {
            return;
        }
        let text = |value| rounded(value, Dimension::Length);
        if let Some(height) = values.number("surface_height")
            && height >= room.height
        {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    values.span("surface_height"),
                    format!(
                        "the surface of \"{}\" is above the ceiling",
                        named.name.value
                    ),
                )
                .label(format!(
                    "room \"{}\" is {} high",
                    room.name,
                    text(room.height)
                ))
                .help(format!("write less than \"{}\"", text(room.height))),
            );
        }
        let half = room.width.min(room.length) / 2.0;
        if let Some(gap) = values.number("gap_to_wall")
            && gap > half
        {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    values.span("gap_to_wall"),
                    format!(
                        "nothing in room \"{}\" is this far from its nearest wall",
                        room.name
                    ),
                )
                .label(format!("at most {}", text(half)))
                .help("leave it out when the item stands far from walls"),
            );
        }
    }

    fn lit_in_time(&mut self, values: &Values) {
        let (Some(starts), Some(end)) =
            (values.number("starts"), self.sheet.root.number("duration"))
        else {
            return;
        };
        if starts > end {
            self.note(
                Fault::error(
                    code::ACTION,
                    values.span("starts"),
                    "it is lit after the end of the run",
                )
                .label(format!("the run ends at {}", rounded(end, Dimension::Time)))
                .help("light it earlier, or make `duration` longer"),
            );
        }
    }

    /// Index of a fuel in the list, put there when it is new.
    fn place_fuel(&mut self, fuels: &mut Vec<Fuel>, fuel: Fuel, values: &Values) -> FuelId {
        if let Some(index) = fuels.iter().position(|known| *known == fuel) {
            return FuelId(index);
        }
        let plain = names::plain(&fuel.name);
        let clash = fuels
            .iter()
            .find(|known| names::plain(&known.name) == plain);
        if let Some(clash) = clash {
            let fault = same_name("fuel", &clash.name, &fuel.name, values.span("fuel"));
            self.note(fault);
        }
        fuels.push(fuel);
        FuelId(fuels.len() - 1)
    }
}
