//! One entry of the timeline.

use std::borrow::Cow;

use serde::Serialize;

use crate::record::{Dimension, Subject};

macro_rules! kinds {
    ($($variant:ident, $name:literal, $doc:literal;)*) => {
        /// What kind of thing happened. The names are stable: they stand in
        /// the tables and in JSON.
        #[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
        #[serde(rename_all = "snake_case")]
        pub enum Kind {
            $(#[doc = $doc] $variant,)*
        }

        impl Kind {
            /// All kinds.
            pub const ALL: &'static [Kind] = &[$(Kind::$variant,)*];

            /// Stable name in tables and JSON.
            pub fn name(self) -> &'static str {
                match self { $(Kind::$variant => $name,)* }
            }

            /// One sentence on what it is and by which rule it is found.
            pub fn meaning(self) -> &'static str {
                match self { $(Kind::$variant => $doc,)* }
            }
        }
    };
}

kinds! {
    Ignition, "ignition", "An item is lit.";
    Action, "action", "The crew or somebody moves an opening or switches a fan, or glass or a door gives way.";
    SmokeAtDoorHead, "smoke_at_door_head", "The smoke level of a room comes down to its highest door or window head for the first time.";
    SmokeToFloor, "smoke_to_floor", "The lower layer of a room is itself smoky: its soot above 30 % of the upper layer's, or the visibility in it below 2 m.";
    ShortOfAir, "short_of_air", "The heat release is below half of the free rate, and the incoming air could not burn all of that.";
    FlamesOut, "flames_out", "The heat release is below 5 % of the free rate.";
    Peak, "peak", "The heat release is at its highest between two actions.";
    AirEarliest, "air_earliest", "The front of the cold air that an opening lets in reaches the seat of the fire at the earliest, by the speed of a gravity current.";
    AirFelt, "air_felt", "The oxygen at the flame base is one percentage point above what it was at the opening.";
    BackUp, "back_up", "The heat release is back above three times its starved level or above its earlier peak, or a room is near flashover again.";
    LayerAt500, "layer_at_500", "The upper layer of a room reaches 500 °C.";
    LayerAt600, "layer_at_600", "The upper layer of a room reaches 600 °C.";
    FloorFlux, "floor_flux", "The radiant flux on the floor of a room reaches 20 kW/m2.";
    Flashover, "flashover", "Both criteria of flashover hold in a room: 600 °C in the layer and 20 kW/m2 on the floor.";
    SmokeAtHead, "smoke_at_head", "The smoke level comes down to head height at a station. A layer that has all but vanished moves its level fast: judge by temperature, oxygen and visibility.";
    Attention, "attention_temperature", "The gas at a station's head height reaches the attention temperature.";
    Out, "out_temperature", "The gas at a station's head height reaches the temperature at which people in training are to be out.";
    LowOxygen, "low_oxygen", "The oxygen at a station's head height falls to its limit.";
    LowVisibility, "low_visibility", "The visibility at a station's head height falls to its limit.";
    HighPressure, "high_pressure", "The pressure in a room is beyond 500 Pa, where windows and doors may give way, which is not modelled.";
    OneWay, "one_way", "The flow through an opening turns one-way: less than a fiftieth of it goes back.";
    TwoWay, "two_way", "The flow through an opening goes both ways again.";
    Mixed, "mixed", "Momentum mixes a room more than by half: there is no cool layer to stay low in.";
    FlameOutside, "flame_outside", "Unburned gas burns outside an opening, with a flame above its head. What it does to the facade is not modelled.";
    BurnedOut, "burned_out", "Less than a twentieth of an item's fuel is left, or its given rate has ended.";
    Stopped, "stopped", "The run ended before the end of the scenario.";
}

/// How much a moment matters to a reader in a hurry.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Weight {
    /// Background.
    Detail,
    /// Ordinary entry.
    Plain,
    /// What the run is about.
    Headline,
}

/// A number behind a moment.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Number {
    /// In plain words.
    pub label: Cow<'static, str>,
    /// Value, SI.
    pub value: f64,
    /// Dimension, which sets the unit.
    pub dimension: Dimension,
}

/// Time since an action.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Since {
    /// Name of the action.
    pub action: String,
    /// Seconds since it began.
    pub seconds: f64,
}

/// Earliest and latest time to expect, s from ignition.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Band {
    /// Earliest, s.
    pub earliest: f64,
    /// Latest, s.
    pub latest: f64,
}

/// One entry of the timeline.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Moment {
    /// When, s from ignition.
    pub time: f64,
    /// Time since the last action; `None` before the first.
    pub since_action: Option<Since>,
    /// What kind of thing.
    pub kind: Kind,
    /// About what.
    pub subject: Subject,
    /// Name of that, as the scenario has it.
    pub name: String,
    /// In plain words, without units.
    pub text: String,
    /// The numbers behind it, SI.
    pub numbers: Vec<Number>,
    /// Earliest and latest to expect, where there is a study behind it.
    pub band: Option<Band>,
    /// How much it matters.
    pub weight: Weight,
}

/// A name as people say it: underscores become spaces.
pub fn spoken(name: &str) -> String {
    name.replace('_', " ")
}
