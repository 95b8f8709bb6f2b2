//! All time histories of one run, in columns with names and units. SI inside;
//! [`crate::show`] turns them into the units people read.

use serde::Serialize;

/// What a column is about: an index into the plan's list of that kind.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
pub enum Subject {
    /// The whole building.
    House,
    /// A room of the plan.
    Room(usize),
    /// An opening of the plan.
    Opening(usize),
    /// An item of the plan.
    Item(usize),
    /// A station of the plan.
    Station(usize),
}

/// Dimension of a column, from which `show` picks unit and scale.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum Dimension {
    /// K inside, shown in °C.
    Temperature,
    /// m.
    Length,
    /// Fraction by volume, 0..1, shown in %.
    VolumeFraction,
    /// Fraction by mass, 0..1, shown in %.
    MassFraction,
    /// Plain ratio, 0..1 or more.
    Ratio,
    /// Pa.
    Pressure,
    /// W inside, shown in kW.
    Power,
    /// W/m2 inside, shown in kW/m2.
    Flux,
    /// kg/s.
    MassFlow,
    /// m/s.
    Speed,
    /// kg.
    Mass,
    /// kg/m3 inside, shown in g/m3.
    Density,
    /// s.
    Time,
}

macro_rules! quantities {
    ($($variant:ident, $label:literal, $dimension:ident, $doc:literal;)*) => {
        /// What a column holds.
        #[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
        pub enum Quantity {
            $(#[doc = $doc] $variant,)*
        }

        impl Quantity {
            /// All quantities, in the order of columns.
            pub const ALL: &'static [Quantity] = &[$(Quantity::$variant,)*];

            /// Plain words for headings.
            pub fn label(self) -> &'static str {
                match self { $(Quantity::$variant => $label,)* }
            }

            /// Dimension, which sets the unit.
            pub fn dimension(self) -> Dimension {
                match self { $(Quantity::$variant => Dimension::$dimension,)* }
            }

            /// One sentence on what it is.
            pub fn meaning(self) -> &'static str {
                match self { $(Quantity::$variant => $doc,)* }
            }
        }
    };
}

quantities! {
    // Rooms
    UpperTemperature, "upper layer temperature", Temperature, "Gas temperature of the upper layer.";
    LowerTemperature, "lower layer temperature", Temperature, "Gas temperature of the lower layer.";
    MeanTemperature, "mean gas temperature", Temperature, "Mean of the gas temperature over the height of the room.";
    Interface, "smoke level", Length, "Height of the interface between the layers above the room's floor.";
    Pressure, "pressure at floor", Pressure, "Gauge pressure at the room's floor against the open air at the same height.";
    UpperOxygen, "upper layer oxygen, wet", VolumeFraction, "Oxygen by volume in the upper layer, water vapour included.";
    LowerOxygen, "lower layer oxygen, wet", VolumeFraction, "Oxygen by volume in the lower layer, water vapour included.";
    UpperOxygenDry, "upper layer oxygen, dry", VolumeFraction, "Oxygen by volume in the upper layer, as an analyser with dried gas reads it.";
    LowerOxygenDry, "lower layer oxygen, dry", VolumeFraction, "Oxygen by volume in the lower layer, as an analyser with dried gas reads it.";
    UpperFuel, "upper layer unburned fuel", MassFraction, "Unburned fuel by mass in the upper layer.";
    LowerFuel, "lower layer unburned fuel", MassFraction, "Unburned fuel by mass in the lower layer.";
    UpperCarbonMonoxide, "upper layer CO", VolumeFraction, "Carbon monoxide by volume in the upper layer.";
    LowerCarbonMonoxide, "lower layer CO", VolumeFraction, "Carbon monoxide by volume in the lower layer.";
    UpperCarbonDioxide, "upper layer CO2", VolumeFraction, "Carbon dioxide by volume in the upper layer.";
    LowerCarbonDioxide, "lower layer CO2", VolumeFraction, "Carbon dioxide by volume in the lower layer.";
    UpperWater, "upper layer water vapour", VolumeFraction, "Water vapour by volume in the upper layer.";
    LowerWater, "lower layer water vapour", VolumeFraction, "Water vapour by volume in the lower layer.";
    UpperSoot, "upper layer soot", Density, "Soot per volume of the upper layer.";
    LowerSoot, "lower layer soot", Density, "Soot per volume of the lower layer.";
    GasMass, "gas in the room", Mass, "Mass of gas in the room.";
    CeilingTemperature, "ceiling", Temperature, "Surface temperature of the ceiling.";
    UpperWallTemperature, "wall above smoke level", Temperature, "Mean surface temperature of the walls above the interface.";
    LowerWallTemperature, "wall below smoke level", Temperature, "Mean surface temperature of the walls below the interface.";
    FloorTemperature, "floor", Temperature, "Surface temperature of the floor.";
    FloorFlux, "radiant flux on the floor", Flux, "Radiation falling on the floor, less what a surface at the outside temperature would send back.";
    Mixing, "exchange of layers by momentum", MassFlow, "Gas that changes places between the layers because momentum mixes them.";
    MixedShare, "mixed by momentum", Ratio, "How far momentum mixes the room: 0 two layers, 1 well mixed.";
    LayerEmissivity, "upper layer emissivity", Ratio, "Emissivity of the upper layer (soot, CO2, H2O) over its mean beam length.";
    BurnedInSmoke, "burned in the smoke", Power, "Heat released by unburned fuel burning inside the layers of the room.";
    BurnedInJets, "burned at openings", Power, "Heat released in the jets that enter the room through its openings.";
    // Openings
    ClearWidth, "clear width", Length, "Clear width of the opening at this time, without the gap of a shut leaf.";
    FlowForward, "flow from first to second side", MassFlow, "Gas going from the first named side to the second.";
    FlowBackward, "flow from second to first side", MassFlow, "Gas going from the second named side to the first.";
    NeutralPlane, "neutral plane", Length, "Lowest height at which the flow turns, above the floor of the first room; empty when one-way.";
    SpeedForward, "speed from first to second side", Speed, "Highest speed of the gas going from the first side to the second, at the opening before contraction.";
    SpeedBackward, "speed from second to first side", Speed, "Highest speed of the gas going from the second side to the first.";
    TemperatureForward, "temperature from first to second side", Temperature, "Mean temperature of the gas going from the first side to the second; empty when there is none.";
    PaneTemperature, "pane", Temperature, "Temperature of the inner pane of a window; empty without glass.";
    OutsideFlame, "flame above the head", Length, "Height of the flame outside above the head of the opening.";
    BurnedOutside, "burned outside", Power, "Heat that unburned fuel going to the open air would release there if it meets ignition; not fed back to the rooms.";
    // Items
    FreeRate, "free rate", Power, "Heat release that the item would have at its progress in clean air.";
    GivenOff, "given off", Power, "Heat of the fuel given off, burned or not.";
    Burned, "burned", Power, "Heat released: at the item for an item, everywhere for the house.";
    FlamedShare, "flamed share", Ratio, "Share of the burning area that carries flame.";
    EmberActivity, "ember activity", Ratio, "Activity of the ember bed, 0..1.";
    BaseOxygen, "oxygen at the flame base", VolumeFraction, "Oxygen by volume, wet, that the base of the flame breathes.";
    FuelLeft, "fuel left", Mass, "Mass that can still be given off.";
    FlameHeight, "flame height", Length, "Mean flame height above the burning surface (Heskestad).";
    Progress, "progress", Time, "The item's own clock along its free-burning curve.";
    FreshAirAtBase, "fresh-air share at the base", Ratio, "Share of the air in the lower layer of the room that the flame base draws.";
    // House
    AirCouldBurn, "incoming air could burn", Power, "Heat that the oxygen in the air coming in from outside could release.";
    // Stations
    StationTemperature, "temperature", Temperature, "Gas temperature at head height, on a reconstructed profile of finite thickness.";
    StationOxygen, "oxygen, dry", VolumeFraction, "Oxygen by volume at head height, dry.";
    StationCarbonMonoxide, "CO", VolumeFraction, "Carbon monoxide by volume at head height.";
    StationCarbonDioxide, "CO2", VolumeFraction, "Carbon dioxide by volume at head height.";
    StationVisibility, "visibility", Length, "Distance at which a reflecting object is lost at head height, at most 30 m.";
    StationFlux, "radiant flux from the layer", Flux, "Radiation of the upper layer and the ceiling at head height, by a view factor from the height, less that of the start.";
}

/// One time history.
#[derive(Debug, Clone, Serialize)]
pub struct Column {
    /// Of what.
    pub subject: Subject,
    /// Which quantity.
    pub quantity: Quantity,
    /// Values at [`Record::time`]; not-a-number where there is none.
    pub values: Vec<f64>,
}

/// Names of the subjects, by index.
#[derive(Debug, Clone, Default, Serialize)]
pub struct Names {
    /// Rooms.
    pub rooms: Vec<String>,
    /// Openings.
    pub openings: Vec<String>,
    /// Items.
    pub items: Vec<String>,
    /// Stations.
    pub stations: Vec<String>,
}

/// Closure of one conserved quantity.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct Closure {
    /// In the building at ignition (kg, or J above 298 K).
    pub at_start: f64,
    /// In the building at the end.
    pub at_end: f64,
    /// Came in through the boundary or was released.
    pub gained: f64,
    /// Went out through the boundary or was lost.
    pub lost: f64,
    /// `|end - start - gained + lost|` over what went through, or over the
    /// content where nothing flows.
    pub relative: f64,
}

/// The run's own audit, integrated with the steps of the state.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct Ledger {
    /// Mass of gas and soot, kg.
    pub mass: Closure,
    /// Energy of gas and surfaces, J; relative to the heat released.
    pub energy: Closure,
    /// Oxygen atoms in all species, kg.
    pub oxygen: Closure,
    /// Carbon atoms in all species, kg.
    pub carbon: Closure,
}

/// Work counters: a machine-independent guard of speed.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq, Serialize)]
pub struct Work {
    /// Evaluations of the derivative by the integrator.
    pub evaluations: u64,
    /// Accepted steps.
    pub steps: u64,
    /// Rejected steps.
    pub rejections: u64,
    /// Newton iterations of the pressure balance.
    pub newton_iterations: u64,
    /// Evaluations in which a guard was touched (trial stages only, unless
    /// flagged).
    pub guards: u64,
}

/// Something a user should know about the run: a sub-model outside its tested
/// range, or a state in which two layers are doubtful.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Flag {
    /// First time, s.
    pub since: f64,
    /// How long in all, s.
    pub duration: f64,
    /// In plain words.
    pub what: String,
}

/// How a run ended.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub enum Ended {
    /// At the end of the scenario.
    Completed,
    /// Stopped by the user at this time, s.
    Interrupted(f64),
    /// Could not go on: time (s) and reason.
    Failed(f64, String),
}

/// A trigger of the plan that fired.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Fired {
    /// Index in the plan's list of triggers.
    pub trigger: usize,
    /// Time at which its change began, s.
    pub time: f64,
}

/// All time histories of one run.
#[derive(Debug, Clone, Serialize)]
pub struct Record {
    /// Names of the subjects.
    pub names: Names,
    /// Output times, s from ignition.
    pub time: Vec<f64>,
    /// Histories, in a fixed order.
    pub columns: Vec<Column>,
    /// The run's own audit.
    pub ledger: Ledger,
    /// Work counters.
    pub work: Work,
    /// What a user should know.
    pub flags: Vec<Flag>,
    /// Triggers that fired, by time.
    pub fired: Vec<Fired>,
    /// How it ended.
    pub ended: Ended,
}

impl Record {
    /// Values of one history, or an empty slice when it is not recorded.
    pub fn get(&self, subject: Subject, quantity: Quantity) -> &[f64] {
        self.columns
            .iter()
            .find(|column| column.subject == subject && column.quantity == quantity)
            .map_or(&[], |column| &column.values)
    }

    /// Name of a subject, as the scenario has it.
    pub fn name(&self, subject: Subject) -> &str {
        match subject {
            Subject::House => "house",
            Subject::Room(i) => &self.names.rooms[i],
            Subject::Opening(i) => &self.names.openings[i],
            Subject::Item(i) => &self.names.items[i],
            Subject::Station(i) => &self.names.stations[i],
        }
    }
}
