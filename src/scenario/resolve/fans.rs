//! Fans.

use super::super::fault::{Fault, code};
use super::super::fields::Of;
use super::super::read::{Located, Named, Sheet, Values};
use super::{Resolver, UNREAD, unwanted, wanted};
use crate::plan::{Fan, FanId, FanKind, Opening, OpeningId, OpeningKind, Room, RoomId, Space};

/// Share of the open door that the cone of a fan covers: all, since its net
/// curve already counts what spills back.
const COVERS: f64 = 1.0;
/// Where intakes and outlets are by default: this share of the height off
/// ceiling and floor.
const MARGIN: f64 = 0.1;

/// Keys that go with each kind, of those that not all kinds have.
const KEYS: [(&str, &[&str]); 4] = [
    ("positive pressure", &["at", "covers"]),
    ("extract", &["from", "intake"]),
    ("supply", &["to", "outlet"]),
    ("duct", &["from", "to", "intake", "outlet"]),
];

impl Resolver<'_> {
    pub(super) fn fans(&mut self, openings: &[Opening], rooms: &[Room]) -> Vec<Fan> {
        let sheet: &Sheet = self.sheet;
        let fans: Vec<Fan> = sheet
            .fans
            .iter()
            .map(|named| self.fan(named, openings, rooms))
            .collect();
        self.cones(&fans);
        fans
    }

    fn fan(&mut self, named: &Named, openings: &[Opening], rooms: &[Room]) -> Fan {
        let values = &named.values;
        let kind = values.text("kind").unwrap_or("duct");
        self.keys_of_fan(values, kind);
        let kind = match kind {
            "positive pressure" => FanKind::PositivePressure {
                opening: self.door_of_fan(values, openings),
                covers: values.number("covers").unwrap_or(COVERS),
            },
            _ => self.duct(values, rooms),
        };
        Fan {
            name: named.name.value.clone(),
            kind,
            free_flow: values.number("free_flow").unwrap_or(UNREAD),
            dead_end_pressure: values.number("dead_end_pressure").unwrap_or(UNREAD),
            running: values.flag("running"),
        }
    }

    fn keys_of_fan(&mut self, values: &Values, kind: &str) {
        let Some((_, own)) = KEYS.iter().find(|(name, _)| *name == kind) else {
            return;
        };
        for key in ["at", "covers", "from", "to", "intake", "outlet"] {
            if values.has(key) && !own.contains(&key) {
                let because = format!("a fan of kind \"{kind}\" has none");
                self.note(unwanted(values, key, &because));
            }
        }
        for key in own.iter().filter(|key| ["at", "from", "to"].contains(key)) {
            if !values.has(key) {
                let because = format!("a fan of kind \"{kind}\" has one");
                self.note(wanted(values, key, &because));
            }
        }
    }

    /// The door that a positive-pressure fan stands at.
    fn door_of_fan(&mut self, values: &Values, openings: &[Opening]) -> OpeningId {
        let Some(name) = values.name("at") else {
            return OpeningId(0);
        };
        let Some(id) = self.opening_id(&name, openings) else {
            return OpeningId(0);
        };
        let opening = &openings[id.0];
        let outside = opening.from == Space::OpenAir || opening.to == Space::OpenAir;
        let upright = matches!(opening.kind, OpeningKind::Door | OpeningKind::Window);
        if !outside || !upright {
            self.note(
                Fault::error(
                    code::CONTRADICTION,
                    name.span,
                    "a positive-pressure fan stands at a door or window to the open air",
                )
                .help("name such an opening, or write kind = \"duct\""),
            );
        }
        id
    }

    fn duct(&mut self, values: &Values, rooms: &[Room]) -> FanKind {
        let from = values.name("from").and_then(|name| self.room_id(&name));
        let to = values.name("to").and_then(|name| self.room_id(&name));
        if from.is_some() && from == to {
            self.note(
                Fault::error(
                    code::CONTRADICTION,
                    values.span("to"),
                    "this fan blows into the room that it takes from",
                )
                .help("name two rooms"),
            );
        }
        let ceiling = |id: RoomId| rooms[id.0].height;
        let intake = values
            .number("intake")
            .or(from.map(|id| (1.0 - MARGIN) * ceiling(id)));
        let outlet = values
            .number("outlet")
            .or(to.map(|id| MARGIN * ceiling(id)));
        for (key, id, height) in [("intake", from, intake), ("outlet", to, outlet)] {
            if let (Some(id), Some(height)) = (id, height) {
                self.under_ceiling_of_fan(values, key, &rooms[id.0], id, height);
            }
        }
        let space = |id: Option<RoomId>| id.map_or(Space::OpenAir, Space::Room);
        FanKind::Duct {
            from: space(from),
            intake: intake.or(outlet).unwrap_or(0.0),
            to: space(to),
            outlet: outlet.or(intake).unwrap_or(0.0),
        }
    }

    fn under_ceiling_of_fan(
        &mut self,
        values: &Values,
        key: &str,
        room: &Room,
        id: RoomId,
        height: f64,
    ) {
        if self.sized(id.0) && height > room.height {
            let high = super::openings::text(room.height);
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    values.span(key),
                    format!("the {key} is above the ceiling of room \"{}\"", room.name),
                )
                .label(format!("the room is {high} high"))
                .help(format!("write at most \"{high}\"")),
            );
        }
    }

    /// The cones of fans at one door cover it once at most.
    fn cones(&mut self, fans: &[Fan]) {
        let sheet: &Sheet = self.sheet;
        let covered = |fan: &Fan| match fan.kind {
            FanKind::PositivePressure { opening, covers } => Some((opening, covers)),
            FanKind::Duct { .. } => None,
        };
        for (index, (fan, named)) in fans.iter().zip(&sheet.fans).enumerate() {
            let Some((opening, _)) = covered(fan) else {
                continue;
            };
            let sum: f64 = fans[..=index]
                .iter()
                .filter_map(covered)
                .filter(|(other, _)| *other == opening)
                .map(|(_, covers)| covers)
                .sum();
            if sum > 1.0 + 1e-9 && named.values.has("at") {
                self.note(
                    Fault::error(
                        code::DOES_NOT_FIT,
                        named.values.span("covers"),
                        "the fans at this door cover more than all of it",
                    )
                    .help("let `covers` of all of them make at most 1"),
                );
            }
        }
    }

    /// Index of a fan by name; a fault when there is none.
    pub(super) fn fan_id(&mut self, name: &Located<String>) -> Option<FanId> {
        let sheet: &Sheet = self.sheet;
        let found = sheet
            .fans
            .iter()
            .position(|fan| fan.name.value == name.value);
        if found.is_none() {
            let known: Vec<&str> = sheet
                .fans
                .iter()
                .map(|fan| fan.name.value.as_str())
                .collect();
            self.unknown(Of::Fan, name, &known);
        }
        found.map(FanId)
    }
}
