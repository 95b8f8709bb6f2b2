//! Keys of `[physics]`: sub-models and coefficients, with their defaults taken
//! from [`Choices`].

use super::{Field, Kind, Need, Shape, Table, Words, default, table};
use crate::plan::Choices;
use crate::units::Dimension as D;

/// A coefficient: its key, and where it lives in [`Choices`].
#[derive(Debug, Clone, Copy)]
pub(in super::super) struct Knob {
    /// The key.
    pub(in super::super) field: Field,
    /// Reads it, SI.
    pub(in super::super) get: fn(&Choices) -> f64,
    /// Sets it, SI.
    pub(in super::super) set: fn(&mut Choices, f64),
}

macro_rules! knobs {
    ($($name:ident, $dimension:ident, $least:expr, $most:expr, $doc:literal;)*) => {
        /// Every coefficient of `[physics]`.
        pub(in super::super) const KNOBS: &[Knob] = &[$(Knob {
            field: Field {
                name: stringify!($name),
                kind: Kind::Quantity(D::$dimension, $least, $most),
                need: Need::Absent("the default of the program"),
                doc: $doc,
                example: "",
            },
            get: |choices| choices.$name,
            set: |choices, value| choices.$name = value,
        },)*];
    };
}

knobs! {
    plume_factor, Ratio, 0.2, 5.0, "Factor on the entrainment of fire plumes (draught in the room).";
    jet_factor, Ratio, 0.0, 5.0, "Factor on the entrainment of the jets of openings.";
    fall_factor, Ratio, 0.0, 5.0, "Factor on the gas dragged down by cold inflow that falls through hot gas; 0.3 to 1.5.";
    downflow_factor, Ratio, 0.0, 5.0, "Factor on the gas that runs down cool walls; 0 switches it off.";
    convection_upper, HeatTransfer, 0.0, 200.0, "Convection coefficient at surfaces in the upper layer.";
    convection_lower, HeatTransfer, 0.0, 200.0, "Convection coefficient at surfaces in the lower layer.";
    convection_behind, HeatTransfer, 0.0, 200.0, "Combined coefficient at the back of linings.";
    critical_flame_temperature, Temperature, 1400.0, 2000.0, "Critical flame temperature; 1600 to 1800 K.";
    limit_width, Ratio, 0.001, 0.05, "Width of the flame limit, oxygen by volume.";
    base_air, Ratio, 1.0, 10.0, "Air a flame needs at its base, in stoichiometric units; 1.5 to 4.";
    flux_exponent, Ratio, 0.0, 4.0, "Exponent of the oxygen ratio in the mass flux; 1 to 2.5.";
    clock_exponent, Ratio, 0.0, 4.0, "Exponent of the oxygen ratio in the progress clock; 1 to 3.";
    feedback_cap, Ratio, 0.0, 10.0, "Cap of the radiation term, in free burning rates.";
    respread_time, Time, 1.0, 600.0, "Time for flames to spread over hot fuel again; 15 to 60 s.";
    flame_out_time, Time, 0.5, 120.0, "Time for a starved flame to go out; 5 to 20 s.";
    ember_strength, Ratio, 0.0, 1.0, "Relighting strength of the ember bed; 0.015 to 0.15.";
    smallest_flame, Ratio, 1e-5, 0.1, "Smallest flamed share that can spread.";
    ember_release, Ratio, 0.0, 0.5, "Glowing release as a share of the free rate.";
    charring_time, Time, 1.0, 3600.0, "Time in which burning makes embers.";
    ember_life, Time, 10.0, 36_000.0, "Life of embers without flames; 200 to 1800 s.";
    breathing_lag, Time, 0.2, 60.0, "Lag of what the flame base breathes; 2 to 10 s.";
    layer_mixing_time, Time, 0.5, 60.0, "Mixing time of burning in a layer; 2 to 12 s.";
    autoignition_start, Temperature, 473.15, 1073.15, "Start of the ignition window of layer gases.";
    autoignition_full, Temperature, 523.15, 1273.15, "End of the ignition window of layer gases.";
    jet_lag, Time, 0.1, 30.0, "Lag of burning in the jets of openings.";
    mixing_factor, Ratio, 0.0, 5.0, "Factor on the mixing of layers by momentum; 0 switches it off.";
    burnout_share, Ratio, 0.01, 1.0, "Share of the mass at which burn-out begins.";
    profile_thickness, Length, 0.01, 2.0, "Thickness of the interface at stations.";
    tolerance, Ratio, 1e-10, 1e-2, "Relative tolerance of the integration.";
}

pub(in super::super) const PHYSICS: Table = Table {
    knobs: KNOBS,
    ..table(
        "physics",
        Shape::One,
        "Sub-models and coefficients. Leave this table out unless you want to see what one of them does.",
        &[
            default(
                "plume",
                Kind::Word(Words::Fixed(&["McCaffrey", "Heskestad", "Zukoski"])),
                "McCaffrey",
                "Plume entrainment: McCaffrey 1979, Heskestad 1984 or Zukoski 1981.",
            ),
            default(
                "placement",
                Kind::Word(Words::Fixed(&["weak", "image", "none"])),
                "weak",
                "How walls near the flame weaken its entrainment: by the measured rooms, by the full image method, or not.",
            ),
        ],
    )
};
