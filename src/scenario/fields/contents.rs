//! Keys of what burns and who is there.

use super::{Field, Kind, Of, Shape, Table, Words, default, optional, required, table};
use crate::units::Dimension as D;

const fn share(least: f64, most: f64) -> Kind {
    Kind::Quantity(D::Ratio, least, most)
}

const AS_FUEL: &str = "as its fuel has it";

const fn yields(name: &'static str, kind: Kind, doc: &'static str, example: &'static str) -> Field {
    optional(name, kind, AS_FUEL, doc, example)
}

const CO: Kind = share(0.0, 0.5);
const SOOT: Kind = share(0.0, 0.5);
const RADIATED: Kind = share(0.0, 0.8);
const RESIDUE: Kind = share(0.0, 0.95);
const OXYGEN_LIMIT: Kind = share(0.08, 0.2);
const CO_DOC: &str = "CO made per mass of volatiles burned, well ventilated.";
const SOOT_DOC: &str = "Soot made per mass of volatiles burned.";
const RADIATED_DOC: &str = "Share of the heat released that the flame radiates.";
const RESIDUE_DOC: &str = "Share of the mass that stays as char, ash or melt.";
const OXYGEN_LIMIT_DOC: &str =
    "Oxygen by volume at 20 °C below which a flame goes out (critical flame temperature 1700 K).";

pub(in super::super) const ITEM: Table = table(
    "item",
    Shape::Named(20),
    "Something that burns.",
    &[
        required("room", Kind::Name(Of::Room), "Where it stands.", "bedroom"),
        required(
            "fuel",
            Kind::Name(Of::Fuel),
            "What it is made of: a fuel of the catalogue, or of this file.",
            "polyurethane mattress with bedding",
        ),
        default(
            "kind",
            Kind::Word(Words::Fixed(&["load", "burner"])),
            "load",
            "A load burns away; a burner gives a fixed flow of gas.",
        ),
        optional(
            "mass",
            Kind::Quantity(D::Mass, 0.001, 100_000.0),
            "required for a load; a burner has none",
            "Mass at ignition, with what will stay as residue.",
            "21 kg",
        ),
        optional(
            "growth",
            Kind::Growth,
            "required for a load",
            "How it burns in the open: slow, medium, fast, ultra-fast, a growth factor, or a list of times and heat release.",
            "fast",
        ),
        optional(
            "peak",
            Kind::Quantity(D::Power, 100.0, 1e9),
            "required with a growth class or factor",
            "Greatest heat release in the open.",
            "1400 kW",
        ),
        default(
            "burns",
            Kind::Word(Words::Fixed(&["freely", "as given"])),
            "freely",
            "Freely: on its own clock, answering to oxygen and radiation. As given: the rate as measured, whatever the room does.",
        ),
        required(
            "surface_height",
            Kind::Quantity(D::Length, 0.0, 30.0),
            "Height above the floor at which the flame's base breathes.",
            "0.5 m",
        ),
        optional(
            "gap_to_wall",
            Kind::Quantity(D::Length, 0.0, 100.0),
            "far from walls",
            "Distance to the nearest wall.",
            "0.3 m",
        ),
        default(
            "corner",
            Kind::Flag,
            "false",
            "Whether the gap is to two walls.",
        ),
        default(
            "starts",
            Kind::Quantity(D::Time, 0.0, 86_400.0),
            "0 s",
            "When it is lit.",
        ),
        optional(
            "at",
            Kind::Two([(D::Length, 0.0, 200.0), (D::Length, 0.0, 200.0)]),
            "no place",
            "Its centre in the room, along width and length from a corner.",
            "[\"1.0 m\", \"0.5 m\"]",
        ),
        optional(
            "rate",
            Kind::Quantity(D::Power, 100.0, 1e8),
            "required for a burner",
            "Heat release of the gas when wholly burned.",
            "250 kW",
        ),
        optional(
            "side",
            Kind::Quantity(D::Length, 0.01, 10.0),
            "required for a burner",
            "Side of the square burner.",
            "0.6 m",
        ),
        default(
            "ramp",
            Kind::Quantity(D::Time, 0.0, 3600.0),
            "5 s",
            "Time a burner takes to full flow.",
        ),
        yields("co_yield", CO, CO_DOC, "0.03"),
        yields("soot_yield", SOOT, SOOT_DOC, "0.1"),
        yields("radiative_fraction", RADIATED, RADIATED_DOC, "0.35"),
        yields("residue_share", RESIDUE, RESIDUE_DOC, "0.2"),
        yields("limiting_oxygen", OXYGEN_LIMIT, OXYGEN_LIMIT_DOC, "0.14"),
    ],
);

const LIKE: &str = "as the fuel it is like; required without `like`";

const fn atoms(name: &'static str, doc: &'static str, example: &'static str) -> Field {
    optional(name, share(0.0, 200.0), LIKE, doc, example)
}

const fn flux(
    name: &'static str,
    least: f64,
    most: f64,
    doc: &'static str,
    example: &'static str,
) -> Field {
    optional(
        name,
        Kind::Quantity(D::Flux, least, most),
        LIKE,
        doc,
        example,
    )
}

pub(in super::super) const FUEL: Table = table(
    "fuel",
    Shape::Named(50),
    "A fuel that the catalogue does not have, or has otherwise. It goes before one of the same name in the catalogue.",
    &[
        optional(
            "like",
            Kind::Name(Of::Fuel),
            "every other key is required",
            "The fuel whose values stand where this one says nothing.",
            "polyurethane foam",
        ),
        atoms(
            "carbon",
            "Carbon atoms in the formula of its volatiles.",
            "1",
        ),
        atoms("hydrogen", "Hydrogen atoms in the formula.", "1.8"),
        atoms("oxygen", "Oxygen atoms in the formula.", "0.3"),
        atoms("nitrogen", "Nitrogen atoms in the formula.", "0.05"),
        optional(
            "heat_of_combustion",
            Kind::Quantity(D::SpecificEnergy, 2e6, 150e6),
            LIKE,
            "Complete net heat of the volatiles; soot and CO take their share away in the run.",
            "26.2 MJ/kg",
        ),
        optional("co_yield", CO, LIKE, CO_DOC, "0.03"),
        optional("soot_yield", SOOT, LIKE, SOOT_DOC, "0.1"),
        optional("residue_share", RESIDUE, LIKE, RESIDUE_DOC, "0.2"),
        optional("radiative_fraction", RADIATED, LIKE, RADIATED_DOC, "0.35"),
        optional(
            "limiting_oxygen",
            OXYGEN_LIMIT,
            LIKE,
            OXYGEN_LIMIT_DOC,
            "0.14",
        ),
        optional(
            "vapour_molar_mass",
            Kind::Quantity(D::MolarMass, 0.002, 1.0),
            LIKE,
            "Molar mass of the unburned vapour.",
            "100 g/mol",
        ),
        optional(
            "vapour_heat_capacity",
            Kind::Two([
                (D::HeatCapacity, 100.0, 20_000.0),
                (D::HeatCapacitySlope, 0.0, 20.0),
            ]),
            LIKE,
            "Heat capacity of the vapour at 0 K (extrapolated) and its rise per kelvin.",
            "[\"600 J/kg/K\", \"2.4 J/kg/K2\"]",
        ),
        flux(
            "doubling_flux",
            1e3,
            500e3,
            "Radiation that doubles the free burning rate.",
            "45 kW/m2",
        ),
        flux(
            "critical_flux",
            0.0,
            200e3,
            "Radiation below which nothing gasifies without a flame.",
            "10 kW/m2",
        ),
        flux(
            "release_per_area",
            10e3,
            20e6,
            "Heat release per burning surface; sets the size of the flame's base.",
            "500 kW/m2",
        ),
    ],
);

const fn limit(name: &'static str, kind: Kind, standard: &'static str, doc: &'static str) -> Field {
    default(name, kind, standard, doc)
}

const fn own_limit(
    name: &'static str,
    kind: Kind,
    doc: &'static str,
    example: &'static str,
) -> Field {
    optional(name, kind, "as in [limits]", doc, example)
}

const HOT: Kind = Kind::Quantity(D::Temperature, 303.15, 1273.15);
const LOW_OXYGEN: Kind = Kind::Quantity(D::Ratio, 0.01, 0.209);
const VISIBILITY: Kind = Kind::Quantity(D::Length, 0.1, 100.0);
const ATTENTION_DOC: &str = "Gas temperature that calls for attention.";
const OUT_DOC: &str = "Gas temperature at which people in training are to be out.";
const OXYGEN_DOC: &str = "Oxygen by volume, as an analyser with dried gas reads it.";
const VISIBILITY_DOC: &str = "Distance at which something that reflects light is seen.";

pub(in super::super) const LIMITS: Table = table(
    "limits",
    Shape::One,
    "What the timeline watches at every station. Equipment and medical figures of practice, not permits.",
    &[
        limit("attention", HOT, "100 °C", ATTENTION_DOC),
        limit("out", HOT, "160 °C", OUT_DOC),
        limit("oxygen", LOW_OXYGEN, "15 %", OXYGEN_DOC),
        limit("visibility", VISIBILITY, "2 m", VISIBILITY_DOC),
    ],
);

pub(in super::super) const STATION: Table = table(
    "station",
    Shape::Named(50),
    "A place and a posture at which exposure is reckoned.",
    &[
        required("room", Kind::Name(Of::Room), "Where.", "hall"),
        optional(
            "posture",
            Kind::Word(Words::Postures),
            "a height is required",
            "Posture, which sets the height of the head.",
            "kneeling",
        ),
        optional(
            "height",
            Kind::Quantity(D::Length, 0.05, 30.0),
            "as the posture has it",
            "Height of the head above the floor.",
            "0.9 m",
        ),
        own_limit("attention", HOT, ATTENTION_DOC, "100 °C"),
        own_limit("out", HOT, OUT_DOC, "160 °C"),
        own_limit("oxygen", LOW_OXYGEN, OXYGEN_DOC, "15 %"),
        own_limit("visibility", VISIBILITY, VISIBILITY_DOC, "2 m"),
    ],
);
