//! Keys of what moves air: wind, fans, glass and doors that give way.

use super::{Field, Kind, Of, Shape, Table, Words, default, optional, required, table};
use crate::units::Dimension as D;

const COEFFICIENT: Kind = Kind::Quantity(D::Ratio, -3.0, 1.5);

pub(in super::super) const WIND: Table = table(
    "wind",
    Shape::One,
    "The wind, steady. It presses on openings whose `facade` is named, and on roof hatches.",
    &[
        default(
            "speed",
            Kind::Quantity(D::Speed, 0.0, 60.0),
            "0 m/s",
            "Speed at the height of the openings; gusts are not modelled.",
        ),
        optional(
            "direction",
            Kind::WordOr(Words::WindFrom, D::Angle, 0.0, 360.0),
            "required when the wind blows on a facade that says where it faces",
            "Where the wind comes from; an angle is counted clockwise from north.",
            "from the west",
        ),
        default(
            "roof_coefficient",
            COEFFICIENT,
            "-0.3",
            "Pressure coefficient of hatches to the open air; -0.2 to -0.8 on flat roofs.",
        ),
    ],
);

pub(in super::super) const FACADE: Table = table(
    "facade",
    Shape::Named(20),
    "A side of the building, on which the wind presses.",
    &[
        optional(
            "faces",
            Kind::WordOr(Words::Compass, D::Angle, 0.0, 360.0),
            "a pressure_coefficient is required",
            "Where somebody looks who looks out of it; an angle is counted clockwise from north.",
            "west",
        ),
        optional(
            "pressure_coefficient",
            COEFFICIENT,
            "by the angle between facade and wind",
            "Wind pressure on it over the dynamic pressure of the wind: about 0.7 to windward, -0.3 to -0.5 at the sides and to leeward.",
            "0.7",
        ),
    ],
);

pub(in super::super) const FAN: Table = table(
    "fan",
    Shape::Named(20),
    "A fan. Its curve is a straight line from free flow to dead-end pressure, what spills back at a door included.",
    &[
        required(
            "kind",
            Kind::Word(Words::Fixed(&[
                "positive pressure",
                "extract",
                "supply",
                "duct",
            ])),
            "In front of a door; out of a room; into a room from the open air; or from one room to another.",
            "positive pressure",
        ),
        optional(
            "at",
            Kind::Name(Of::Opening),
            "required for positive pressure",
            "The door to the open air in front of which it stands.",
            "front_door",
        ),
        optional(
            "covers",
            Kind::Quantity(D::Ratio, 0.05, 1.0),
            "1 for positive pressure: its curve already counts what spills back",
            "Share of the open door that its cone covers; gas passes freely through the rest.",
            "90 %",
        ),
        optional(
            "from",
            Kind::Name(Of::Room),
            "required for extract and duct",
            "The room that it takes gas from.",
            "kitchen",
        ),
        optional(
            "to",
            Kind::Name(Of::Room),
            "required for supply and duct",
            "The room that it blows into.",
            "hall",
        ),
        optional(
            "intake",
            Kind::Quantity(D::Length, 0.0, 30.0),
            "a tenth of the height below the ceiling",
            "Height of its intake above the floor, for extract and duct.",
            "2.2 m",
        ),
        optional(
            "outlet",
            Kind::Quantity(D::Length, 0.0, 30.0),
            "a tenth of the height above the floor",
            "Height of its outlet above the floor, for supply and duct.",
            "0.3 m",
        ),
        required(
            "free_flow",
            Kind::Quantity(D::VolumeFlow, 1e-4, 100.0),
            "Flow when nothing holds it back; 2 to 5 m3/s through a door for a portable fan (from memory).",
            "3 m3/s",
        ),
        required(
            "dead_end_pressure",
            Kind::Quantity(D::Pressure, 0.1, 5000.0),
            "Pressure at which nothing flows any more.",
            "60 Pa",
        ),
        default(
            "running",
            Kind::Flag,
            "false",
            "Whether it runs at ignition; actions start and stop it.",
        ),
    ],
);

const HOT: Kind = Kind::Quantity(D::Temperature, 333.15, 1673.15);
const RISE: Kind = Kind::Quantity(D::TemperatureDifference, 10.0, 1200.0);
const SHARE: Kind = Kind::Quantity(D::Ratio, 0.01, 1.0);
const WAIT: Kind = Kind::Quantity(D::Time, 0.0, 86_400.0);

const FRACTION_DOC: &str = "Share of the clear width that comes open; 0.25 to 1 is uncertain.";
const DELAY_DOC: &str =
    "How long after the level is passed; 0 to 180 s is uncertain. It counts on if the gas cools.";

/// Keys of glass, in a scenario and in a models file.
pub(super) const GLASS_KEYS: &[Field] = &[
    required(
        "thickness",
        Kind::Quantity(D::Length, 0.0005, 0.1),
        "Thickness of the inner pane.",
        "4 mm",
    ),
    default(
        "density",
        Kind::Quantity(D::Density, 100.0, 10_000.0),
        "2500 kg/m3",
        "Density.",
    ),
    default(
        "heat_capacity",
        Kind::Quantity(D::HeatCapacity, 100.0, 5000.0),
        "840 J/kg/K",
        "Heat capacity.",
    ),
    default(
        "emissivity",
        Kind::Quantity(D::Ratio, 0.05, 1.0),
        "0.84",
        "Emissivity of its inner face.",
    ),
    default(
        "layer",
        HOT,
        "450 °C",
        "Layer temperature at which it falls out, unless the window says otherwise.",
    ),
    default(
        "glass",
        RISE,
        "205 K",
        "Rise of the pane at which it falls out, where the window asks for it.",
    ),
    default("fraction", SHARE, "1", FRACTION_DOC),
    default("delay", WAIT, "0 s", DELAY_DOC),
];

pub(in super::super) const GLASS: Table = table(
    "glass",
    Shape::Named(400),
    "Glass that the catalogue does not have. It goes before glass of the same name in the catalogue.",
    GLASS_KEYS,
);

/// Keys of a door leaf in a models file.
pub(super) const LEAF_KEYS: &[Field] = &[
    required(
        "layer",
        HOT,
        "Layer temperature from which the time counts.",
        "300 °C",
    ),
    default("fraction", SHARE, "1", FRACTION_DOC),
    required("delay", WAIT, DELAY_DOC, "5 min"),
];

const LAYER: Field = optional(
    "layer",
    HOT,
    "not watched, unless nothing else is: then as the catalogue has it",
    "Layer temperature of the room (of either room) at which it gives way.",
    "500 °C",
);
const AT: Field = optional(
    "at",
    WAIT,
    "at no set time",
    "Time at which it gives way, counted from ignition.",
    "4 min",
);
const FRACTION: Field = optional(
    "fraction",
    SHARE,
    "as the catalogue has it",
    FRACTION_DOC,
    "100 %",
);
const DELAY: Field = optional("delay", WAIT, "as the catalogue has it", DELAY_DOC, "30 s");
const OVER: Field = default(
    "over",
    Kind::Quantity(D::Time, 0.1, 3600.0),
    "3 s",
    "How long it takes to come open.",
);

pub(in super::super) const FALLS_OUT: Table = table(
    "falls_out",
    Shape::Inner,
    "When the glass of a window falls out. Of several conditions the first that comes true counts. \
     Short forms: `\"never\"`, `\"by layer temperature\"`, `\"by glass temperature\"`, `\"at 240 s\"`.",
    &[
        LAYER,
        optional(
            "glass",
            RISE,
            "not watched",
            "Rise of the inner pane over the room's start at which it gives way.",
            "205 K",
        ),
        AT,
        FRACTION,
        DELAY,
        OVER,
    ],
);

pub(in super::super) const FAILS: Table = table(
    "fails",
    Shape::Inner,
    "When a shut door fails. Of several conditions the first that comes true counts. \
     Short forms: `\"never\"`, `\"by layer temperature\"`, `\"at 12 min\"`.",
    &[LAYER, AT, FRACTION, DELAY, OVER],
);
