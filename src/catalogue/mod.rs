//! What `models/` holds: fuels, linings, growth classes, door positions and
//! gaps, postures; each row with its source. Embedded in the program, so that
//! an installed one needs no folder.

mod listing;
mod load;

pub use listing::{Format, listing};

use crate::plan::{Fuel, Lining, Pane};
use std::sync::OnceLock;

/// Everything `models/` holds, in SI, in the order of the files.
#[derive(Debug, Clone, Default)]
pub struct Catalogue {
    /// Fuels.
    pub fuels: Vec<FuelRow>,
    /// Linings.
    pub linings: Vec<LiningRow>,
    /// Growth classes.
    pub growth: Vec<NumberRow>,
    /// Positions of doors and windows.
    pub positions: Vec<PositionRow>,
    /// Leak areas of shut doors and windows, m2.
    pub gaps: Vec<NumberRow>,
    /// Heights of heads by posture, m above the floor.
    pub postures: Vec<NumberRow>,
    /// Glass of windows.
    pub glass: Vec<GlassRow>,
    /// Door leaves that fail.
    pub leaves: Vec<LeafRow>,
    /// Rows that could not be read; empty in a released program (a test holds
    /// it so).
    pub faults: Vec<String>,
}

/// A fuel with its published chemical heat and its source.
#[derive(Debug, Clone)]
pub struct FuelRow {
    /// What the solver uses.
    pub fuel: Fuel,
    /// Published heat released per mass of item, J/kg, for the cross-check.
    pub chemical_heat: f64,
    /// What it stands for.
    pub note: String,
    /// Where the numbers come from.
    pub source: String,
}

/// A lining with its source.
#[derive(Debug, Clone)]
pub struct LiningRow {
    /// What the solver uses.
    pub lining: Lining,
    /// What it stands for.
    pub note: String,
    /// Where the numbers come from.
    pub source: String,
}

/// Glass, and when it falls out.
#[derive(Debug, Clone)]
pub struct GlassRow {
    /// What the solver heats.
    pub pane: Pane,
    /// Layer temperature at which it falls out, K.
    pub layer: f64,
    /// Rise of the pane at which it falls out, K.
    pub rise: f64,
    /// Share of the clear width that comes open, 0..1.
    pub fraction: f64,
    /// How long after the level is passed, s.
    pub delay: f64,
    /// What it stands for, with the ranges.
    pub note: String,
    /// Where the numbers come from.
    pub source: String,
}

/// A door leaf, and when it fails.
#[derive(Debug, Clone)]
pub struct LeafRow {
    /// Name as written in a scenario.
    pub name: String,
    /// Layer temperature from which the time counts, K.
    pub layer: f64,
    /// Share of the clear width that comes open, 0..1.
    pub fraction: f64,
    /// How long after the level is passed, s.
    pub delay: f64,
    /// What it stands for, with the ranges.
    pub note: String,
    /// Where the numbers come from.
    pub source: String,
}

/// A named number: growth factor (W/s2), gap (m2) or posture (m).
#[derive(Debug, Clone)]
pub struct NumberRow {
    /// Name as written in a scenario.
    pub name: String,
    /// Value, SI.
    pub value: f64,
    /// What it stands for.
    pub note: String,
    /// Where it comes from.
    pub source: String,
}

/// How wide a named position is.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Clear {
    /// Share of the full clear width, 0..1.
    Share(f64),
    /// Clear width, m, whatever the door.
    Width(f64),
}

impl Clear {
    /// Clear width of an opening this wide, m.
    pub fn of(self, width: f64) -> f64 {
        match self {
            Clear::Share(share) => share * width,
            Clear::Width(clear) => clear,
        }
    }
}

/// A position of a door or window, as crews say it.
#[derive(Debug, Clone)]
pub struct PositionRow {
    /// Name as written in a scenario.
    pub name: String,
    /// How wide.
    pub clear: Clear,
    /// What it stands for.
    pub note: String,
    /// Where it comes from.
    pub source: String,
}

impl Catalogue {
    /// Fuel by name.
    pub fn fuel(&self, name: &str) -> Option<&FuelRow> {
        self.fuels.iter().find(|row| row.fuel.name == name)
    }

    /// Lining by name.
    pub fn lining(&self, name: &str) -> Option<&LiningRow> {
        self.linings.iter().find(|row| row.lining.name == name)
    }

    /// Growth class by name, W/s2.
    pub fn growth(&self, name: &str) -> Option<f64> {
        number(&self.growth, name)
    }

    /// Gap by name, m2.
    pub fn gap(&self, name: &str) -> Option<f64> {
        number(&self.gaps, name)
    }

    /// Posture by name, m above the floor.
    pub fn posture(&self, name: &str) -> Option<f64> {
        number(&self.postures, name)
    }

    /// Glass by name.
    pub fn glass(&self, name: &str) -> Option<&GlassRow> {
        self.glass.iter().find(|row| row.pane.name == name)
    }

    /// Door leaf by name.
    pub fn leaf(&self, name: &str) -> Option<&LeafRow> {
        self.leaves.iter().find(|row| row.name == name)
    }

    /// Position by name.
    pub fn position(&self, name: &str) -> Option<Clear> {
        self.positions
            .iter()
            .find(|row| row.name == name)
            .map(|row| row.clear)
    }
}

fn number(rows: &[NumberRow], name: &str) -> Option<f64> {
    rows.iter()
        .find(|row| row.name == name)
        .map(|row| row.value)
}

/// The catalogue of this program, read once.
pub fn catalogue() -> &'static Catalogue {
    static CATALOGUE: OnceLock<Catalogue> = OnceLock::new();
    CATALOGUE.get_or_init(load::embedded)
}

#[cfg(test)]
#[allow(clippy::unwrap_used)]
mod tests {
    use super::*;
    use crate::units::{self, Dimension};

    /// Heat of burning carbon to CO2 instead of leaving it as soot, J/kg.
    const SOOT_HEAT: f64 = 32.8e6;
    /// Heat of burning CO to CO2, J/kg.
    const CO_HEAT: f64 = 10.1e6;

    #[test]
    fn verify_every_row_reads_and_names_its_source() {
        let catalogue = catalogue();
        assert!(catalogue.faults.is_empty(), "{:?}", catalogue.faults);
        assert!(catalogue.fuels.len() >= 14);
        assert!(catalogue.linings.len() >= 15);
        let sources = catalogue
            .fuels
            .iter()
            .map(|row| &row.source)
            .chain(catalogue.linings.iter().map(|row| &row.source))
            .chain(catalogue.growth.iter().map(|row| &row.source))
            .chain(catalogue.gaps.iter().map(|row| &row.source))
            .chain(catalogue.postures.iter().map(|row| &row.source))
            .chain(catalogue.positions.iter().map(|row| &row.source))
            .chain(catalogue.glass.iter().map(|row| &row.source))
            .chain(catalogue.leaves.iter().map(|row| &row.source));
        for source in sources {
            assert!(source.len() > 10);
        }
    }

    /// Huggett 1980, Fire Mater 4:61: 13.1 MJ per kg of oxygen, held to 8 %.
    #[test]
    fn formula_heat_per_oxygen_of_every_fuel() {
        for row in &catalogue().fuels {
            let fuel = &row.fuel;
            let mass = fuel.carbon * 12.011
                + fuel.hydrogen * 1.008
                + fuel.oxygen * 15.999
                + fuel.nitrogen * 14.007;
            let moles = fuel.carbon + fuel.hydrogen / 4.0 - fuel.oxygen / 2.0;
            let per_oxygen = fuel.heat_of_combustion * mass / (moles * 31.998);
            let ratio = per_oxygen / 13.1e6;
            assert!((ratio - 1.0).abs() < 0.08, "{}: {ratio}", fuel.name);
        }
    }

    #[test]
    fn formula_published_chemical_heat_of_every_fuel() {
        for row in &catalogue().fuels {
            let fuel = &row.fuel;
            let released = (1.0 - fuel.residue_share)
                * (fuel.heat_of_combustion - SOOT_HEAT * fuel.soot_yield - CO_HEAT * fuel.co_yield);
            let ratio = released / row.chemical_heat;
            assert!((ratio - 1.0).abs() < 0.05, "{}: {ratio}", fuel.name);
        }
    }

    #[test]
    fn formula_growth_classes_reach_1055_kw() {
        for (name, time) in [
            ("slow", 600.0),
            ("medium", 300.0),
            ("fast", 150.0),
            ("ultra-fast", 75.0),
        ] {
            let heat: f64 = catalogue().growth(name).unwrap() * time * time;
            assert!((heat / 1055e3 - 1.0).abs() < 2e-3, "{name}: {heat}");
        }
    }

    #[test]
    fn practice_the_words_of_crews() {
        let catalogue = catalogue();
        let width = units::read("0.9 m", Dimension::Length).unwrap();
        assert_eq!(catalogue.position("hand's width").unwrap().of(width), 0.13);
        assert!((catalogue.position("one third").unwrap().of(width) - 0.3).abs() < 1e-12);
        assert_eq!(catalogue.posture("kneeling"), Some(1.0));
        assert_eq!(catalogue.gap("interior door"), Some(0.012));
    }
}
