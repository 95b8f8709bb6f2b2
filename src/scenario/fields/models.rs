//! Keys of a user's own models file: rows in the form of the files of
//! `models/`. Fuels, linings and glass have the keys of the scenario's own.

use super::air::{GLASS_KEYS, LEAF_KEYS};
use super::contents::FUEL;
use super::house::LINING;
use super::{Field, Kind, Shape, Table, optional, required, table};
use crate::units::Dimension as D;

const NAME: Field = required("name", Kind::Text, "Name, as written in a scenario.", "own");
const NOTE: Field = optional(
    "note",
    Kind::Text,
    "nothing is said",
    "What it stands for.",
    "as tested",
);
const SOURCE: Field = required(
    "source",
    Kind::Text,
    "Where the numbers come from.",
    "own measurement",
);

/// Keys that every row has beside its own.
const ROW: &[Field] = &[NAME, NOTE, SOURCE];

const fn row(name: &'static str, doc: &'static str, keys: &'static [Field]) -> Table {
    Table {
        row: ROW,
        ..table(name, Shape::List(200), doc, keys)
    }
}

const FUEL_ROW: Table = Table {
    row: &[
        NAME,
        NOTE,
        SOURCE,
        optional(
            "chemical_heat",
            Kind::Quantity(D::SpecificEnergy, 1e6, 150e6),
            "not cross-checked",
            "Published heat released per mass of item; for the cross-check only.",
            "17.5 MJ/kg",
        ),
    ],
    ..row("fuel", "A fuel; keys as in [fuel.NAME].", FUEL.keys)
};

/// What a models file may hold.
pub(in super::super) const MODEL_ROWS: &[&Table] = &[
    &FUEL_ROW,
    &row("lining", "A lining; keys as in [lining.NAME].", LINING.keys),
    &row("glass", "Glass; keys as in [glass.NAME].", GLASS_KEYS),
    &row("leaf", "A door leaf that fails.", LEAF_KEYS),
    &row(
        "growth",
        "A growth class.",
        &[required(
            "factor",
            Kind::Quantity(D::GrowthFactor, 1e-3, 1e5),
            "Heat release over the square of time.",
            "0.0469 kW/s2",
        )],
    ),
    &row(
        "position",
        "A position of doors, windows and hatches: one of share and clear_width.",
        &[
            optional(
                "share",
                Kind::Quantity(D::Ratio, 0.0, 1.0),
                "a clear_width is required",
                "Share of the clear width.",
                "50 %",
            ),
            optional(
                "clear_width",
                Kind::Quantity(D::Length, 0.0, 50.0),
                "a share is required",
                "Clear width, whatever the door.",
                "13 cm",
            ),
        ],
    ),
    &row(
        "gap",
        "The gap that a shut door or window leaks by.",
        &[required(
            "area",
            Kind::Quantity(D::Area, 0.0, 10.0),
            "Orifice area.",
            "0.012 m2",
        )],
    ),
    &row(
        "posture",
        "A posture of people.",
        &[required(
            "height",
            Kind::Quantity(D::Length, 0.05, 30.0),
            "Height of the head above the floor.",
            "1.0 m",
        )],
    ),
];
