//! A fuel as the solver uses it.

use serde::Serialize;

/// A fuel's volatiles: composition, heat, yields, vapour and burning limits.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Fuel {
    /// Name in the catalogue or the scenario.
    pub name: String,
    /// Carbon atoms in the empirical formula.
    pub carbon: f64,
    /// Hydrogen atoms in the empirical formula.
    pub hydrogen: f64,
    /// Oxygen atoms in the empirical formula.
    pub oxygen: f64,
    /// Nitrogen atoms in the empirical formula.
    pub nitrogen: f64,
    /// Net heat of complete combustion of the volatiles at 298 K, J/kg.
    pub heat_of_combustion: f64,
    /// CO made per kg of volatiles burned, kg/kg.
    pub co_yield: f64,
    /// Soot made per kg of volatiles burned, kg/kg.
    pub soot_yield: f64,
    /// Share of an item's mass that stays as char, ash or melt, 0..1.
    pub residue_share: f64,
    /// Share of the heat released that the flame radiates, 0..1.
    pub radiative_fraction: f64,
    /// Oxygen volume fraction at 20 °C below which a flame goes out at a
    /// critical flame temperature of 1700 K.
    pub limiting_oxygen: f64,
    /// Molar mass of the unburned vapour, kg/mol.
    pub vapour_molar_mass: f64,
    /// Heat capacity of the vapour `a + b T`, J/kg/K and J/kg/K2.
    pub vapour_heat_capacity: [f64; 2],
    /// Radiant flux that doubles the free burning rate, W/m2.
    pub doubling_flux: f64,
    /// Radiant flux below which nothing gasifies without a flame, W/m2.
    pub critical_flux: f64,
    /// Heat release per area of burning surface, W/m2; sets the size of the
    /// flame's base.
    pub release_per_area: f64,
}
