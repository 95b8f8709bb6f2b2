//! The one table of scenario keys. A key is defined here and nowhere else;
//! the reader, the messages, near names and `docs/scenario.md` come from it.

mod actions;
mod air;
mod contents;
mod house;
mod models;
mod physics;

pub(super) use physics::{KNOBS, Knob};

use crate::catalogue::Catalogue;
use crate::units::Dimension;

/// What a value may be.
#[derive(Debug, Clone, Copy)]
pub(super) enum Kind {
    /// Free text.
    Text,
    /// true or false.
    Flag,
    /// A quantity within a range (SI, both ends allowed).
    Quantity(Dimension, f64, f64),
    /// One of some words.
    Word(Words),
    /// One of some words, or a quantity within a range.
    WordOr(Words, Dimension, f64, f64),
    /// A growth class, a growth factor, or a list of time and heat release.
    Growth,
    /// Two quantities in a list, each within a range.
    Two([(Dimension, f64, f64); 2]),
    /// Courses of a lining.
    Courses,
    /// The name of something.
    Name(Of),
    /// Names of several things: least and greatest number.
    Names(Of, usize, usize),
    /// Openings and their positions at ignition.
    Starts,
    /// An inner table.
    Inner(&'static Table),
    /// When something gives way: an inner table, or one of its short forms.
    GivesWay(&'static Table),
    /// What an action waits for.
    Condition,
    /// Changes of air per hour at a pressure.
    AirChanges,
}

/// Sets of words.
#[derive(Debug, Clone, Copy)]
pub(super) enum Words {
    /// Given here.
    Fixed(&'static [&'static str]),
    /// Door positions of the catalogue.
    Positions,
    /// Gaps of the catalogue.
    Gaps,
    /// Postures of the catalogue.
    Postures,
    /// Points of the compass.
    Compass,
    /// Where the wind comes from.
    WindFrom,
}

/// Points of the compass, an eighth of a turn apart, clockwise from north.
pub(super) const COMPASS: [&str; 8] = [
    "north",
    "north-east",
    "east",
    "south-east",
    "south",
    "south-west",
    "west",
    "north-west",
];

/// The same as crews say it of the wind.
pub(super) const WIND_FROM: [&str; 8] = [
    "from the north",
    "from the north-east",
    "from the east",
    "from the south-east",
    "from the south",
    "from the south-west",
    "from the west",
    "from the north-west",
];

impl Words {
    /// The words.
    pub(super) fn list(self, catalogue: &Catalogue) -> Vec<&str> {
        fn names(rows: &[crate::catalogue::NumberRow]) -> Vec<&str> {
            rows.iter().map(|row| row.name.as_str()).collect()
        }
        match self {
            Words::Fixed(words) => words.to_vec(),
            Words::Positions => catalogue
                .positions
                .iter()
                .map(|row| row.name.as_str())
                .collect(),
            Words::Gaps => names(&catalogue.gaps),
            Words::Postures => names(&catalogue.postures),
            Words::Compass => COMPASS.to_vec(),
            Words::WindFrom => WIND_FROM.to_vec(),
        }
    }
}

/// What a name refers to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Of {
    /// A room.
    Room,
    /// A room or the open air.
    Side,
    /// An opening.
    Opening,
    /// A fuel of the scenario or the catalogue.
    Fuel,
    /// A lining of the scenario or the catalogue.
    Lining,
    /// An action of the base.
    Action,
    /// A facade.
    Facade,
    /// A fan.
    Fan,
    /// Glass of the scenario or the catalogue.
    Glass,
    /// A door leaf of the catalogue.
    Leaf,
}

impl Of {
    /// In a word.
    pub(super) fn words(self) -> &'static str {
        match self {
            Of::Room => "room",
            Of::Side => "room or \"open air\"",
            Of::Opening => "opening",
            Of::Fuel => "fuel",
            Of::Lining => "lining",
            Of::Action => "action",
            Of::Facade => "facade",
            Of::Fan => "fan",
            Of::Glass => "glass",
            Of::Leaf => "leaf",
        }
    }
}

/// Whether a key must be there.
#[derive(Debug, Clone, Copy)]
pub(super) enum Need {
    /// It must.
    Required,
    /// Otherwise this text stands, read like any other.
    Default(&'static str),
    /// Otherwise this happens.
    Absent(&'static str),
}

/// One key.
#[derive(Debug, Clone, Copy)]
pub(super) struct Field {
    /// As written.
    pub(super) name: &'static str,
    /// What its value may be.
    pub(super) kind: Kind,
    /// Whether it must be there.
    pub(super) need: Need,
    /// One sentence for the reference.
    pub(super) doc: &'static str,
    /// A value that reads well, as written in the file.
    pub(super) example: &'static str,
}

/// How often a table may be there.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Shape {
    /// Keys at the top of the file.
    Root,
    /// Once, `[name]`.
    One,
    /// Several, each with a name, `[name.NAME]`, and how many at most.
    Named(usize),
    /// Several in a row, `[[name]]`, and how many at most.
    List(usize),
    /// Inside a list of another table.
    Inner,
}

/// One table.
#[derive(Debug, Clone, Copy)]
pub(super) struct Table {
    /// As written; empty for the top of the file.
    pub(super) name: &'static str,
    /// How often.
    pub(super) shape: Shape,
    /// Sentences for the reference.
    pub(super) doc: &'static str,
    keys: &'static [Field],
    /// Keys before its own, of a row in a models file.
    row: &'static [Field],
    knobs: &'static [Knob],
}

impl Table {
    /// Its keys.
    pub(super) fn fields(&self) -> impl Iterator<Item = &'static Field> {
        let (row, keys): (&'static [Field], &'static [Field]) = (self.row, self.keys);
        let knobs: &'static [Knob] = self.knobs;
        row.iter()
            .chain(keys)
            .chain(knobs.iter().map(|knob| &knob.field))
    }

    /// One of its keys.
    pub(super) fn field(&self, name: &str) -> Option<&'static Field> {
        self.fields().find(|field| field.name == name)
    }

    /// As a user sees its header.
    pub(super) fn header(&self) -> String {
        match self.shape {
            Shape::Root => "the top of the file".to_owned(),
            Shape::One => format!("[{}]", self.name),
            Shape::Named(_) => format!("[{}.NAME]", self.name),
            Shape::List(_) => format!("[[{}]]", self.name),
            Shape::Inner => format!("{{ {} }}", self.name),
        }
    }
}

const fn required(
    name: &'static str,
    kind: Kind,
    doc: &'static str,
    example: &'static str,
) -> Field {
    Field {
        name,
        kind,
        need: Need::Required,
        doc,
        example,
    }
}

const fn default(name: &'static str, kind: Kind, text: &'static str, doc: &'static str) -> Field {
    Field {
        name,
        kind,
        need: Need::Default(text),
        doc,
        example: text,
    }
}

const fn optional(
    name: &'static str,
    kind: Kind,
    absent: &'static str,
    doc: &'static str,
    example: &'static str,
) -> Field {
    Field {
        name,
        kind,
        need: Need::Absent(absent),
        doc,
        example,
    }
}

const fn table(
    name: &'static str,
    shape: Shape,
    doc: &'static str,
    keys: &'static [Field],
) -> Table {
    Table {
        name,
        shape,
        doc,
        keys,
        row: &[],
        knobs: &[],
    }
}

pub(super) use actions::{ACTION, TACTIC, TACTIC_ACTION};
pub(super) use air::{FACADE, FAILS, FALLS_OUT, FAN, GLASS, WIND};
pub(super) use contents::{FUEL, ITEM, LIMITS, STATION};
pub(super) use house::{
    COURSE, INDOORS, LEAKAGE, LINING, OPEN_AIR, OPENING, ROOM, ROOT, SHARED_WALL,
};
pub(super) use models::MODEL_ROWS;
pub(super) use physics::PHYSICS;

/// Every table, in the order of the reference page.
pub(super) const TABLES: &[&Table] = &[
    &ROOT,
    &OPEN_AIR,
    &WIND,
    &FACADE,
    &INDOORS,
    &ROOM,
    &LINING,
    &COURSE,
    &SHARED_WALL,
    &OPENING,
    &GLASS,
    &FALLS_OUT,
    &FAILS,
    &LEAKAGE,
    &FAN,
    &ITEM,
    &FUEL,
    &STATION,
    &LIMITS,
    &ACTION,
    &TACTIC,
    &TACTIC_ACTION,
    &PHYSICS,
];

/// What the outside is called wherever a room's name may stand.
pub(super) const OPEN_AIR_NAME: &str = "open air";
