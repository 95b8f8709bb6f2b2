//! The scenario resolved: indices, SI numbers, a schedule of actions; nothing
//! left to look up. Built by [`crate::scenario`] (or by hand in tests), used
//! by [`crate::solve`]. All quantities SI: m, s, kg, K, Pa, W, J.

mod choices;
mod fuel;

pub use choices::{Choices, PlacementRule, PlumeModel};
pub use fuel::Fuel;

use serde::Serialize;

/// Index of a room in [`Plan::rooms`].
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
pub struct RoomId(pub usize);

/// Index of an opening in [`Plan::openings`].
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
pub struct OpeningId(pub usize);

/// Index of a fuel in [`Plan::fuels`].
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
pub struct FuelId(pub usize);

/// Everything the solver needs for one run.
#[derive(Debug, Clone, Serialize)]
pub struct Plan {
    /// Title of the scenario.
    pub title: String,
    /// End of the run, s from ignition.
    pub end: f64,
    /// The air outside.
    pub open_air: OpenAir,
    /// Rooms, in the order of the scenario file.
    pub rooms: Vec<Room>,
    /// Walls between two rooms, heated from both sides.
    pub shared_walls: Vec<SharedWall>,
    /// Everything air passes through, leakage included.
    pub openings: Vec<Opening>,
    /// Distinct fuels of the items.
    pub fuels: Vec<Fuel>,
    /// What burns.
    pub items: Vec<Item>,
    /// Where people are.
    pub stations: Vec<Station>,
    /// Fans and ducts.
    pub fans: Vec<Fan>,
    /// Changes at stated times, sorted by time.
    pub actions: Vec<Action>,
    /// Changes that wait for a condition: failing glass and doors, and actions
    /// with `when`.
    pub triggers: Vec<Trigger>,
    /// Sub-models and coefficients in use.
    pub choices: Choices,
    /// Name of the tactic played, if any.
    pub tactic: Option<String>,
}

/// The air outside.
#[derive(Debug, Clone, Serialize)]
pub struct OpenAir {
    /// Temperature, K.
    pub temperature: f64,
    /// Relative humidity, fraction 0..1.
    pub humidity: f64,
    /// Pressure at the reference level, Pa.
    pub pressure: f64,
}

/// A box of air.
#[derive(Debug, Clone, Serialize)]
pub struct Room {
    /// Name in the scenario file.
    pub name: String,
    /// Width, m.
    pub width: f64,
    /// Length, m.
    pub length: f64,
    /// Height, m.
    pub height: f64,
    /// Height of the floor above the reference level, m (0 on one level).
    pub floor_level: f64,
    /// Temperature of gas and linings at ignition, K.
    pub temperature: f64,
    /// Ceiling lining, hot face first.
    pub ceiling: Lining,
    /// Wall lining, hot face first.
    pub walls: Lining,
    /// Floor lining, hot face first.
    pub floor: Lining,
    /// Temperature of the air behind the linings, K.
    pub behind: f64,
}

impl Room {
    /// Floor area, m2.
    pub fn floor_area(&self) -> f64 {
        self.width * self.length
    }

    /// Volume, m3.
    pub fn volume(&self) -> f64 {
        self.floor_area() * self.height
    }

    /// Perimeter, m.
    pub fn perimeter(&self) -> f64 {
        2.0 * (self.width + self.length)
    }
}

/// What a surface is made of, from the hot face inwards.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Lining {
    /// Name in the catalogue or the scenario.
    pub name: String,
    /// Emissivity of the hot face, 0..1.
    pub emissivity: f64,
    /// Courses from the hot face inwards.
    pub courses: Vec<Course>,
}

/// One course of material in a lining.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Course {
    /// Thickness, m.
    pub thickness: f64,
    /// Thermal conductivity, W/m/K.
    pub conductivity: f64,
    /// Density, kg/m3.
    pub density: f64,
    /// Heat capacity, J/kg/K.
    pub heat_capacity: f64,
}

/// A wall between two rooms, heated from both sides; its length is taken off
/// the outer walls of both.
#[derive(Debug, Clone, Serialize)]
pub struct SharedWall {
    /// Name in the scenario file.
    pub name: String,
    /// The two rooms; the lining is read from the first to the second.
    pub between: [RoomId; 2],
    /// Length of the wall, m.
    pub length: f64,
    /// Lining from the face in the first room to the face in the second.
    pub lining: Lining,
}

/// Where an opening leads.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum Space {
    /// A room.
    Room(RoomId),
    /// Outside.
    OpenAir,
}

/// Kind of an opening, for words and pictures; the flow does not depend on it.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum OpeningKind {
    /// A door.
    Door,
    /// A window.
    Window,
    /// Leakage, spread over the height.
    Gap,
    /// A horizontal opening in a floor, ceiling or roof.
    Hatch,
    /// A stair: an inclined opening between two levels.
    Stair,
    /// The open border between two parts of one long room.
    Division,
}

impl OpeningKind {
    /// True for an opening whose flow is that of a horizontal one: the first
    /// side lies below the second.
    pub fn is_horizontal(self) -> bool {
        matches!(self, Self::Hatch | Self::Stair)
    }
}

/// Anything air passes through.
#[derive(Debug, Clone, Serialize)]
pub struct Opening {
    /// Name in the scenario file; for leakage, `"NAME in ROOM"`.
    pub name: String,
    /// What it is.
    pub kind: OpeningKind,
    /// First side; positive flow goes from here.
    pub from: Space,
    /// Second side.
    pub to: Space,
    /// Height of the lower edge above the floor of the first room, m.
    pub sill: f64,
    /// Height of the upper edge above the floor of the first room, m.
    pub head: f64,
    /// Full clear width, m (0 for a gap).
    pub width: f64,
    /// Flow coefficient of the open part.
    pub coefficient: f64,
    /// Clear width at ignition, m, 0 when shut.
    pub clear_width: f64,
    /// Leak area when shut, m2, shrinking in proportion as it opens; the whole
    /// area for a gap. An orifice area, used with [`Opening::gap_coefficient`].
    pub gap_area: f64,
    /// Orifice coefficient that goes with the gap area.
    pub gap_coefficient: f64,
    /// Centre of the opening in the first room, m from its corner, when given.
    pub at: Option<[f64; 2]>,
    /// Pressure of the wind on its outer face, Pa; zero indoors and in calm.
    pub wind_pressure: f64,
    /// Plan area of a hatch or stair when wholly open, m2 (its share that is
    /// open is clear width over width); zero for vertical openings.
    pub area: f64,
    /// Factor on the buoyant exchange of a hatch or stair over that of a thin
    /// square hole, 1 for a hatch.
    pub exchange_factor: f64,
    /// Glass that may crack and fall out, for a window.
    pub pane: Option<Pane>,
}

/// A pane of glass heated by the room's gas and radiation.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Pane {
    /// Words for it ("double glazing").
    pub name: String,
    /// Thickness of the inner pane, m.
    pub thickness: f64,
    /// Density, kg/m3.
    pub density: f64,
    /// Heat capacity, J/kg/K.
    pub heat_capacity: f64,
    /// Emissivity of its inner face.
    pub emissivity: f64,
}

/// Index of a fan in [`Plan::fans`].
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
pub struct FanId(pub usize);

/// What a fan does.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub enum FanKind {
    /// A positive-pressure fan in front of an opening to the open air; blows in
    /// through the given share of its clear width, the rest stays open.
    PositivePressure {
        /// The opening it stands at.
        opening: OpeningId,
        /// Share of the clear width that its cone covers, 0..1.
        covers: f64,
    },
    /// Moves gas from one space to another: extract, supply or a duct between
    /// rooms.
    Duct {
        /// Where it takes gas.
        from: Space,
        /// Height of the intake above the floor of that room, m.
        intake: f64,
        /// Where it blows gas.
        to: Space,
        /// Height of the outlet above the floor of that room, m.
        outlet: f64,
    },
}

/// A fan with a straight net curve from its free flow to its dead-end pressure.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Fan {
    /// Name in the scenario file.
    pub name: String,
    /// What it does.
    pub kind: FanKind,
    /// Volume flow at zero pressure rise, m3/s.
    pub free_flow: f64,
    /// Pressure rise at which the flow stops, Pa.
    pub dead_end_pressure: f64,
    /// Runs at ignition.
    pub running: bool,
}

/// Words of [`Action::what`] and [`Trigger::what`] for a change that nobody
/// makes: glass falls out, a door fails.
pub const GIVES_WAY: [&str; 2] = ["falls out", "fails"];

/// What an action or trigger changes.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub enum Effect {
    /// Sets an opening to a clear width, m (0 shut).
    ClearWidth {
        /// Which opening.
        opening: OpeningId,
        /// Clear width when done, m.
        width: f64,
    },
    /// Starts or stops a fan.
    Fan {
        /// Which fan.
        fan: FanId,
        /// Starts when true.
        running: bool,
    },
}

impl Effect {
    /// The opening that it changes, if it is one.
    pub fn opening(&self) -> Option<OpeningId> {
        match self {
            Self::ClearWidth { opening, .. } => Some(*opening),
            Self::Fan { .. } => None,
        }
    }
}

/// A quantity that a trigger watches.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub enum Watched {
    /// Upper layer temperature of a room, K.
    UpperTemperature(RoomId),
    /// Height of the interface of a room, m.
    Interface(RoomId),
    /// Upper layer oxygen of a room, wet volume fraction.
    UpperOxygen(RoomId),
    /// Heat released in the whole building, W.
    HeatRelease,
    /// Rise of a pane over the room's start, K.
    PaneRise(OpeningId),
}

/// A change that waits for a condition; fires once.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Trigger {
    /// Name in the scenario file, or made from the opening ("window falls out").
    pub name: String,
    /// What is watched.
    pub watched: Watched,
    /// Fires when the quantity rises past the level (true) or falls past it.
    pub rising: bool,
    /// Level, in the unit of what is watched.
    pub level: f64,
    /// Not before this time, s.
    pub not_before: f64,
    /// Waits this long after the level is passed, s.
    pub delay: f64,
    /// Takes, s.
    pub over: f64,
    /// What it changes.
    pub effect: Effect,
    /// Glass and doors that fail only ever open further: the change is left
    /// out where it would close.
    pub only_widens: bool,
    /// What is done, in words.
    pub what: String,
    /// Why, in the user's words.
    pub because: Option<String>,
}

/// How the burning of an item is given.
#[derive(Debug, Clone, Serialize)]
pub enum Burning {
    /// A free-burning curve with progress clock, feedback and embers.
    Growing(Curve),
    /// The rate as measured: release follows the clock of the run, no
    /// feedback, no embers.
    AsGiven(Curve),
    /// A gas burner with fixed flow.
    Burner {
        /// Heat release rate of the flow when wholly burned, W.
        rate: f64,
        /// Time to full flow, s.
        ramp: f64,
        /// Side of the square burner, m.
        side: f64,
    },
}

/// Heat release of a free-burning item against time.
#[derive(Debug, Clone, Serialize)]
pub enum Curve {
    /// `alpha t^2` up to a peak.
    Growth {
        /// Growth factor, W/s2.
        alpha: f64,
        /// Peak, W.
        peak: f64,
    },
    /// Time (s) and heat release (W), rising times, linear between, zero after.
    Table(Vec<(f64, f64)>),
}

/// Something that burns.
#[derive(Debug, Clone, Serialize)]
pub struct Item {
    /// Name in the scenario file.
    pub name: String,
    /// Where it stands.
    pub room: RoomId,
    /// What it is made of.
    pub fuel: FuelId,
    /// Mass at ignition, kg (infinite for a burner).
    pub mass: f64,
    /// How it burns.
    pub burning: Burning,
    /// Height at which the flame's base breathes, m above the floor.
    pub surface_height: f64,
    /// Distance to the nearest wall, m; far when `None`.
    pub gap_to_wall: Option<f64>,
    /// True when the gap is to two walls (a corner).
    pub in_corner: bool,
    /// Ignition, s from the start of the run.
    pub ignition: f64,
    /// Place in the room, m from its corner, when given.
    pub at: Option<[f64; 2]>,
}

/// A place and a posture at which exposure is reckoned.
#[derive(Debug, Clone, Serialize)]
pub struct Station {
    /// Name in the scenario file.
    pub name: String,
    /// Where.
    pub room: RoomId,
    /// Height of the head above the floor, m.
    pub height: f64,
    /// Posture in words ("kneeling"), for labels.
    pub posture: String,
    /// Limits that the timeline watches.
    pub limits: Limits,
}

/// Limits at a station; equipment and medical figures, not permits.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Limits {
    /// Gas temperature that calls for attention, K.
    pub attention_temperature: f64,
    /// Gas temperature at which people in training are to be out, K.
    pub out_temperature: f64,
    /// Oxygen, dry volume fraction.
    pub oxygen: f64,
    /// Visibility of a reflecting object, m.
    pub visibility: f64,
}

/// One timed change.
#[derive(Debug, Clone, Serialize)]
pub struct Action {
    /// Name in the scenario file.
    pub name: String,
    /// Begins, s from ignition.
    pub time: f64,
    /// Takes, s.
    pub over: f64,
    /// What it changes.
    pub effect: Effect,
    /// What is done, in words ("open", "shut", "hand's width").
    pub what: String,
    /// Why, in the user's words.
    pub because: Option<String>,
}
