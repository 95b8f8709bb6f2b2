//! Keys of the building.

use super::{Field, Kind, Of, Shape, Table, Words, default, optional, required, table};
use crate::units::Dimension as D;

const fn length(least: f64, most: f64) -> Kind {
    Kind::Quantity(D::Length, least, most)
}

/// Temperatures of weather and rooms, K: -60 to 60 °C.
const AMBIENT: Kind = Kind::Quantity(D::Temperature, 213.15, 333.15);

pub(in super::super) const ROOT: Table = table(
    "",
    Shape::Root,
    "What the scenario is called and how long it runs.",
    &[
        required(
            "title",
            Kind::Text,
            "Title, shown on everything that comes out.",
            "Larch Row 3: front door opened on a fire short of air",
        ),
        required(
            "duration",
            Kind::Quantity(D::Time, 1.0, 86_400.0),
            "End of the run, counted from ignition.",
            "15 min",
        ),
        optional(
            "models",
            Kind::Text,
            "only the catalogue of the program",
            "A file beside this one with your own rows, in the form of the files of models/. A row goes before one of the same name in the catalogue.",
            "my-models.toml",
        ),
    ],
);

pub(in super::super) const OPEN_AIR: Table = table(
    "open_air",
    Shape::One,
    "The air outside.",
    &[
        default("temperature", AMBIENT, "20 °C", "Temperature outside."),
        default(
            "humidity",
            Kind::Quantity(D::Ratio, 0.0, 1.0),
            "50 %",
            "Relative humidity outside; the air indoors begins with the same water.",
        ),
        default(
            "pressure",
            Kind::Quantity(D::Pressure, 50_000.0, 110_000.0),
            "101.325 kPa",
            "Air pressure at floor level.",
        ),
    ],
);

pub(in super::super) const INDOORS: Table = table(
    "indoors",
    Shape::One,
    "The air and the linings of all rooms at ignition.",
    &[default(
        "temperature",
        AMBIENT,
        "20 °C",
        "Temperature at ignition; a room may say its own.",
    )],
);

const fn lining(name: &'static str, standard: &'static str, doc: &'static str) -> Field {
    default(name, Kind::Name(Of::Lining), standard, doc)
}

pub(in super::super) const ROOM: Table = table(
    "room",
    Shape::Named(40),
    "A box of air with one floor. Its name is what other tables call it.",
    &[
        required(
            "width",
            length(0.3, 100.0),
            "Shorter or first side of the floor.",
            "4.0 m",
        ),
        required(
            "length",
            length(0.3, 200.0),
            "Other side of the floor.",
            "3.2 m",
        ),
        required("height", length(1.0, 60.0), "Floor to ceiling.", "2.4 m"),
        default(
            "floor_level",
            length(-200.0, 1000.0),
            "0 m",
            "Height of its floor above the reference level of the building.",
        ),
        lining("walls", "gypsum plasterboard 13 mm", "Lining of the walls."),
        lining(
            "ceiling",
            "gypsum plasterboard 13 mm",
            "Lining of the ceiling.",
        ),
        lining("floor", "timber floor", "Lining of the floor."),
        default(
            "behind",
            Kind::WordOr(
                Words::Fixed(&["indoors", "open air"]),
                D::Temperature,
                213.15,
                333.15,
            ),
            "indoors",
            "Temperature behind the linings: as indoors at ignition, as in the open air, or stated.",
        ),
        optional(
            "temperature",
            AMBIENT,
            "as in [indoors]",
            "Temperature of its air and linings at ignition.",
            "18 °C",
        ),
    ],
);

pub(in super::super) const LINING: Table = table(
    "lining",
    Shape::Named(400),
    "A lining that the catalogue does not have. It goes before one of the same name in the catalogue.",
    &[
        default(
            "emissivity",
            Kind::Quantity(D::Ratio, 0.05, 1.0),
            "0.9",
            "Emissivity of the hot face.",
        ),
        required(
            "courses",
            Kind::Courses,
            "Courses of material from the hot face inwards, at most eight.",
            "[{ thickness = \"15 mm\", conductivity = \"0.2 W/m/K\", density = \"790 kg/m3\", heat_capacity = \"1000 J/kg/K\" }]",
        ),
    ],
);

pub(in super::super) const COURSE: Table = table(
    "courses",
    Shape::Inner,
    "One course of material in a lining.",
    &[
        required("thickness", length(0.0001, 2.0), "Thickness.", "15 mm"),
        required(
            "conductivity",
            Kind::Quantity(D::Conductivity, 0.01, 500.0),
            "Thermal conductivity.",
            "0.2 W/m/K",
        ),
        required(
            "density",
            Kind::Quantity(D::Density, 5.0, 20_000.0),
            "Density.",
            "790 kg/m3",
        ),
        required(
            "heat_capacity",
            Kind::Quantity(D::HeatCapacity, 100.0, 10_000.0),
            "Heat capacity.",
            "1000 J/kg/K",
        ),
    ],
);

pub(in super::super) const SHARED_WALL: Table = table(
    "shared_wall",
    Shape::Named(200),
    "A wall between two rooms that conducts into both. Walls not named here have the temperature `behind` at their back.",
    &[
        required(
            "between",
            Kind::Names(Of::Room, 2, 2),
            "The two rooms; the lining is read from the first to the second.",
            "[\"bedroom\", \"hall\"]",
        ),
        required("length", length(0.1, 200.0), "Length of the wall.", "3.2 m"),
        lining(
            "lining",
            "two gypsum plasterboards 13 mm",
            "Lining from face to face.",
        ),
    ],
);

pub(in super::super) const OPENING: Table = table(
    "opening",
    Shape::Named(400),
    "A door, window, hatch or gap between two rooms or to the open air. Between rooms on different levels, heights count from the floor of the first.",
    &[
        default(
            "kind",
            Kind::Word(Words::Fixed(&[
                "door", "window", "gap", "hatch", "stair", "division",
            ])),
            "door",
            "What it is. A gap is always there. A hatch lies flat in a floor, ceiling or roof; a stair joins two levels and is always open. A division is the open border between two parts of one long room.",
        ),
        required(
            "between",
            Kind::Names(Of::Side, 2, 2),
            "The two sides, rooms or \"open air\"; flow from the first to the second counts forward. The lower room of a hatch or stair comes first.",
            "[\"hall\", \"open air\"]",
        ),
        optional(
            "width",
            length(0.01, 50.0),
            "required for doors and windows; of a hatch the side of a square; of a division the side that both parts share",
            "Clear width when open.",
            "0.9 m",
        ),
        optional(
            "head",
            length(0.05, 60.0),
            "required for doors, windows and gaps",
            "Height of its upper edge above the floor of the first room.",
            "2.0 m",
        ),
        optional(
            "sill",
            length(0.0, 60.0),
            "0 m for doors, windows and gaps",
            "Height of its lower edge above the floor of the first room.",
            "0.9 m",
        ),
        optional(
            "area",
            Kind::Quantity(D::Area, 1e-4, 200.0),
            "a stair has one; a hatch has one, or width and length",
            "Area in plan of a hatch or stair, wholly open.",
            "1.0 m2",
        ),
        optional(
            "length",
            length(0.01, 50.0),
            "with width instead of an area",
            "Other side of a hatch.",
            "0.6 m",
        ),
        optional(
            "position",
            Kind::WordOr(Words::Positions, D::Length, 0.0, 50.0),
            "`\"shut\"`",
            "At ignition: a position of the catalogue (`shut`, `open`, `half`, `one third`, `hand's width`, ...) or a clear width.",
            "shut",
        ),
        optional(
            "gap",
            Kind::WordOr(Words::Gaps, D::Area, 0.0, 10.0),
            "\"interior door\" between rooms, \"front door\" to the open air, \"window\" for windows, \"none\" for hatches; required for a gap",
            "Leak area when shut, an orifice area: a gap of the catalogue or an area.",
            "0.012 m2",
        ),
        default(
            "coefficient",
            Kind::Quantity(D::Ratio, 0.1, 1.0),
            "0.7",
            "Flow coefficient of the open part.",
        ),
        default(
            "gap_coefficient",
            Kind::Quantity(D::Ratio, 0.1, 1.0),
            "0.6",
            "Orifice coefficient that goes with the gap.",
        ),
        optional(
            "exchange_factor",
            Kind::Quantity(D::Ratio, 0.0, 10.0),
            "3 for a stair, 1 for a hatch",
            "Factor on the buoyant exchange over that of a square hole; a stair lets hot gas up along its ceiling and cool gas down along its steps: 1 to 5 (from memory).",
            "3",
        ),
        optional(
            "facade",
            Kind::Name(Of::Facade),
            "no wind on it; a hatch to the open air is on the roof",
            "The facade in which it lies, for the wind.",
            "street",
        ),
        optional(
            "wind_pressure",
            Kind::Quantity(D::Pressure, -10_000.0, 10_000.0),
            "by the facade",
            "Pressure of the wind on it, stated instead of a facade.",
            "34 Pa",
        ),
        optional(
            "glass",
            Kind::Name(Of::Glass),
            "a window that holds",
            "Glass of a window: `single thin`, `single thick`, `double`, or your own. A window with glass falls out unless `falls_out` says never.",
            "double",
        ),
        optional(
            "falls_out",
            Kind::GivesWay(&super::FALLS_OUT),
            "by layer temperature as the glass has it",
            "When the glass falls out; uncertain by nature, vary it.",
            "{ layer = \"500 °C\", fraction = \"100 %\", delay = \"0 s\" }",
        ),
        optional(
            "leaf",
            Kind::Name(Of::Leaf),
            "a door that holds",
            "Leaf of a door: `hollow`, `solid`. A door with a leaf fails unless `fails` says never.",
            "hollow",
        ),
        optional(
            "fails",
            Kind::GivesWay(&super::FAILS),
            "by layer temperature as the leaf has it",
            "When the door fails in the fire.",
            "{ layer = \"300 °C\", delay = \"5 min\" }",
        ),
        optional(
            "at",
            Kind::Two([(D::Length, 0.0, 200.0), (D::Length, 0.0, 200.0)]),
            "no place",
            "Its centre in the first room, along the room's width and length from a corner.",
            "[\"6.0 m\", \"0.6 m\"]",
        ),
    ],
);

pub(in super::super) const LEAKAGE: Table = table(
    "leakage",
    Shape::Named(50),
    "Leakage of the building, spread over the full height of the rooms in proportion to their floors.",
    &[
        required(
            "rooms",
            Kind::Names(Of::Room, 1, 40),
            "The rooms that leak.",
            "[\"bedroom\", \"hall\"]",
        ),
        default(
            "to",
            Kind::Name(Of::Side),
            super::OPEN_AIR_NAME,
            "Where to.",
        ),
        optional(
            "area",
            Kind::Quantity(D::Area, 1e-6, 10.0),
            "air_changes is required",
            "Orifice area of all of it together.",
            "0.06 m2",
        ),
        optional(
            "air_changes",
            Kind::AirChanges,
            "an area is required",
            "An air-tightness figure instead of an area, over the volume of the rooms named.",
            "5 per hour at 50 Pa",
        ),
        default(
            "coefficient",
            Kind::Quantity(D::Ratio, 0.1, 1.0),
            "0.6",
            "Orifice coefficient that goes with the area.",
        ),
        optional(
            "facade",
            Kind::Name(Of::Facade),
            "no wind on it",
            "The facade through which it leaks, for the wind.",
            "street",
        ),
    ],
);
