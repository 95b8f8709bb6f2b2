//! Sub-models and coefficients of a run, every one with its default; the
//! scenario's `[physics]` table overrides them by the names used here.

use serde::Serialize;

/// Which plume entrainment law is used.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum PlumeModel {
    /// McCaffrey 1979, NBSIR 79-1910 (default).
    McCaffrey,
    /// Heskestad 1984.
    Heskestad,
    /// Zukoski 1981.
    Zukoski,
}

/// How a wall near the flame weakens its entrainment.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum PlacementRule {
    /// Effective mirror number 1.2 at a wall, 1.5 in a corner (default, by the
    /// measured room series).
    Weak,
    /// Full image method, 2 at a wall, 4 in a corner (touching flames).
    Image,
    /// No effect.
    None,
}

/// Sub-models and coefficients in use.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Choices {
    /// Plume law.
    pub plume: PlumeModel,
    /// Placement rule for flames near walls.
    pub placement: PlacementRule,
    /// Factor on the entrainment of fire plumes (room draught), default 1.
    pub plume_factor: f64,
    /// Factor on the entrainment of the jets of openings, default 1.
    pub jet_factor: f64,
    /// Factor on the gas dragged down by cold inflow falling through hot gas,
    /// default 1 (0.3..1.5).
    pub fall_factor: f64,
    /// Factor on wall-cooled downflow, default 1 (0 switches it off).
    pub downflow_factor: f64,
    /// Convection coefficient at surfaces in the upper layer, W/m2/K, default 15.
    pub convection_upper: f64,
    /// Convection coefficient at surfaces in the lower layer, W/m2/K, default 10.
    pub convection_lower: f64,
    /// Combined coefficient at the back of linings, W/m2/K, default 10.
    pub convection_behind: f64,
    /// Critical flame temperature, K, default 1700 (sampled 1600..1800).
    pub critical_flame_temperature: f64,
    /// Width of the flame limit in oxygen volume fraction, default 0.01.
    pub limit_width: f64,
    /// Air a flame needs at its base, in stoichiometric units, default 3.
    pub base_air: f64,
    /// Exponent of the oxygen ratio in the mass flux, default 2 (1..2.5).
    pub flux_exponent: f64,
    /// Exponent of the oxygen ratio in the progress clock, default 2 (1..3).
    pub clock_exponent: f64,
    /// Cap of the radiation term, default 2.5.
    pub feedback_cap: f64,
    /// Time for flames to spread over hot fuel again, s, default 20 (15..60).
    pub respread_time: f64,
    /// Time for a starved flame to go out, s, default 10 (5..20).
    pub flame_out_time: f64,
    /// Relighting strength of the ember bed, default 0.05 (0.015..0.15).
    pub ember_strength: f64,
    /// Smallest flamed share that can spread, default 0.005.
    pub smallest_flame: f64,
    /// Glowing release as a share of the free rate, default 0.02.
    pub ember_release: f64,
    /// Charring time, s, default 60.
    pub charring_time: f64,
    /// Ember life, s, default 600 (200..1800).
    pub ember_life: f64,
    /// Lag of what the flame base breathes, s, default 4 (2..10).
    pub breathing_lag: f64,
    /// Mixing time of burning in a layer, s, default 5 (2..12).
    pub layer_mixing_time: f64,
    /// Start of the ignition window of layer gases, K, default 723.15 (450 °C).
    pub autoignition_start: f64,
    /// End of the ignition window of layer gases, K, default 873.15 (600 °C).
    pub autoignition_full: f64,
    /// Lag of burning in jets, s, default 1.
    pub jet_lag: f64,
    /// Share of the mass at which burn-out begins, default 0.3.
    pub burnout_share: f64,
    /// Factor on the mixing of layers by momentum, default 1 (0 switches it off).
    pub mixing_factor: f64,
    /// Thickness of the interface at stations, m, default 0.5.
    pub profile_thickness: f64,
    /// Relative tolerance of the integration, default 1e-5.
    pub tolerance: f64,
}

impl Default for Choices {
    fn default() -> Self {
        Self {
            plume: PlumeModel::McCaffrey,
            placement: PlacementRule::Weak,
            plume_factor: 1.0,
            jet_factor: 1.0,
            fall_factor: 1.0,
            downflow_factor: 1.0,
            convection_upper: 15.0,
            convection_lower: 10.0,
            convection_behind: 10.0,
            critical_flame_temperature: 1700.0,
            limit_width: 0.01,
            base_air: 3.0,
            flux_exponent: 2.0,
            clock_exponent: 2.0,
            feedback_cap: 2.5,
            respread_time: 20.0,
            flame_out_time: 10.0,
            ember_strength: 0.05,
            smallest_flame: 0.005,
            ember_release: 0.02,
            charring_time: 60.0,
            ember_life: 600.0,
            breathing_lag: 4.0,
            layer_mixing_time: 5.0,
            autoignition_start: 723.15,
            autoignition_full: 873.15,
            jet_lag: 1.0,
            burnout_share: 0.3,
            mixing_factor: 1.0,
            profile_thickness: 0.5,
            tolerance: 1e-5,
        }
    }
}
