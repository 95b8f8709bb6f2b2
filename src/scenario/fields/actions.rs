//! Keys of what is done.

use super::{Field, Kind, Of, Shape, Table, Words, default, optional, required, table};
use crate::units::Dimension as D;

const ACTION_KEYS: &[Field] = &[
    required(
        "name",
        Kind::Text,
        "Name, by which a tactic replaces or drops it.",
        "entry",
    ),
    optional(
        "at",
        Kind::Quantity(D::Time, 0.0, 86_400.0),
        "one of at and when is required",
        "When it begins, counted from ignition.",
        "8 min",
    ),
    optional(
        "when",
        Kind::Condition,
        "one of at and when is required",
        "What it waits for: `layer temperature`, `smoke level` or `oxygen` (of the upper layer, wet) of a room, or `heat release` of the building, above (`>`) or below (`<`) a quantity. It is done once.",
        "hall layer temperature > 300 °C",
    ),
    optional(
        "not_before",
        Kind::Quantity(D::Time, 0.0, 86_400.0),
        "from ignition on",
        "With when: the condition is not looked at before this time.",
        "2 min",
    ),
    optional(
        "delay",
        Kind::Quantity(D::Time, 0.0, 86_400.0),
        "at once",
        "With when: how long after the condition comes true.",
        "30 s",
    ),
    optional(
        "open",
        Kind::Name(Of::Opening),
        "one of open, shut, set, start and stop is required",
        "The door, window or hatch that is opened wholly.",
        "front_door",
    ),
    optional(
        "shut",
        Kind::Name(Of::Opening),
        "one of open, shut, set, start and stop is required",
        "The door, window or hatch that is shut.",
        "front_door",
    ),
    optional(
        "set",
        Kind::Name(Of::Opening),
        "one of open, shut, set, start and stop is required",
        "The door, window or hatch that is set to a position.",
        "front_door",
    ),
    optional(
        "start",
        Kind::Name(Of::Fan),
        "one of open, shut, set, start and stop is required",
        "The fan that is started.",
        "door_fan",
    ),
    optional(
        "stop",
        Kind::Name(Of::Fan),
        "one of open, shut, set, start and stop is required",
        "The fan that is stopped.",
        "door_fan",
    ),
    optional(
        "to",
        Kind::WordOr(Words::Positions, D::Length, 0.0, 50.0),
        "required with set",
        "The position: as in the catalogue, or a clear width.",
        "hand's width",
    ),
    default(
        "over",
        Kind::Quantity(D::Time, 0.1, 3600.0),
        "1 s",
        "How long the movement takes.",
    ),
    optional(
        "because",
        Kind::Text,
        "nothing is said",
        "Why, in your words; shown in the timeline.",
        "crew makes entry",
    ),
];

pub(in super::super) const ACTION: Table = table(
    "action",
    Shape::List(500),
    "One change of a door, window, hatch or fan, at a time or when something comes true. One door makes one movement at a time.",
    ACTION_KEYS,
);

pub(in super::super) const TACTIC: Table = table(
    "tactic",
    Shape::Named(50),
    "Another way of playing the same scenario. Its actions are added to the base; one with the name of a base action takes its place.",
    &[
        optional(
            "note",
            Kind::Text,
            "nothing is said",
            "What it is.",
            "door held after entry",
        ),
        optional(
            "drop",
            Kind::Names(Of::Action, 1, 500),
            "nothing is left out",
            "Base actions that are left out, by name.",
            "[\"entry\"]",
        ),
        optional(
            "start",
            Kind::Starts,
            "as in the base",
            "Positions at ignition that differ from the base.",
            "{ bedroom_door = \"shut\" }",
        ),
        optional(
            "holds",
            Kind::Names(Of::Opening, 1, 100),
            "glass and doors give way as in the base",
            "Windows and doors that do not fall out or fail in this tactic.",
            "[\"bedroom_window\"]",
        ),
        optional(
            "wind",
            Kind::Inner(&super::WIND),
            "as in the base",
            "What is different about the wind.",
            "{ speed = \"9 m/s\" }",
        ),
    ],
);

pub(in super::super) const TACTIC_ACTION: Table = Table {
    doc: "An action of a tactic, `[[tactic.NAME.action]]`; keys as in [[action]].",
    name: "tactic.NAME.action",
    ..ACTION
};
