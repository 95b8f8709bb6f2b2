//! What a kilogram of burned volatiles takes and makes, and how fast fuel
//! that is already in a layer burns.

use std::fmt;

/// Atomic masses, kg/mol; IUPAC abridged standard values, from memory.
pub const CARBON: f64 = 12.011e-3;
/// Atomic mass of hydrogen, kg/mol.
pub const HYDROGEN: f64 = 1.008e-3;
/// Atomic mass of oxygen, kg/mol.
pub const OXYGEN: f64 = 15.999e-3;
/// Atomic mass of nitrogen, kg/mol.
pub const NITROGEN: f64 = 14.007e-3;

/// Heat that carbon monoxide keeps, J/kg (net heat of combustion 283 kJ/mol,
/// from memory).
pub const CO_HEAT: f64 = 10.1e6;
/// Heat that soot keeps, J/kg (graphite 393.5 kJ/mol, from memory).
pub const SOOT_HEAT: f64 = 32.8e6;

/// Atoms in the empirical formula of a fuel, `C_c H_h O_o N_n`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Formula {
    /// Carbon atoms.
    pub c: f64,
    /// Hydrogen atoms.
    pub h: f64,
    /// Oxygen atoms.
    pub o: f64,
    /// Nitrogen atoms.
    pub n: f64,
}

impl Formula {
    /// Molar mass of the empirical formula, kg/mol.
    #[must_use]
    pub fn molar_mass(&self) -> f64 {
        self.c * CARBON + self.h * HYDROGEN + self.o * OXYGEN + self.n * NITROGEN
    }
}

/// Why a fuel cannot burn as described.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum ReactionFault {
    /// A number is negative or not finite, or there are no atoms.
    NotAFuel,
    /// CO and soot would hold more carbon than the fuel: both in kg per kg.
    TooLittleCarbon {
        /// Carbon asked for by the yields, kg/kg.
        asked: f64,
        /// Carbon in the fuel, kg/kg.
        held: f64,
    },
    /// The fuel carries so much oxygen that burning would set some free.
    NoOxygenNeeded,
    /// CO and soot would keep all of the heat, or more.
    NoHeatLeft,
}

impl fmt::Display for ReactionFault {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NotAFuel => write!(f, "the formula, heat and yields must be positive numbers"),
            Self::TooLittleCarbon { asked, held } => write!(
                f,
                "the CO and soot yields ask for {asked:.3} kg of carbon per kg, the fuel holds {held:.3}"
            ),
            Self::NoOxygenNeeded => {
                write!(f, "the fuel needs no oxygen from the air with these yields")
            }
            Self::NoHeatLeft => write!(f, "the CO and soot yields leave no heat"),
        }
    }
}

impl std::error::Error for ReactionFault {}

/// What one kilogram of volatiles takes and makes, all in kg per kg burned
/// unless stated. Atoms balance exactly.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Reaction {
    /// Oxygen consumed.
    pub oxygen: f64,
    /// Carbon dioxide made.
    pub carbon_dioxide: f64,
    /// Water vapour made.
    pub water: f64,
    /// Carbon monoxide made.
    pub carbon_monoxide: f64,
    /// Soot made, pure carbon.
    pub soot: f64,
    /// Nitrogen set free from the fuel.
    pub nitrogen: f64,
    /// Heat released, J per kg burned.
    pub heat: f64,
    /// Heat released per kg of oxygen consumed, J/kg.
    pub heat_per_oxygen: f64,
}

impl Reaction {
    /// Balance of `C_c H_h O_o N_n` burning to CO2, H2O, N2 and the stated
    /// yields of CO and soot (kg per kg of volatiles).
    ///
    /// `complete_heat` is the net heat of complete combustion of the
    /// volatiles, J/kg; the heat released is that less what CO (10.1 MJ/kg)
    /// and soot (32.8 MJ/kg) keep.
    ///
    /// # Errors
    /// A [`ReactionFault`] where the numbers cannot describe a fuel, the
    /// yields exceed the carbon, or no oxygen or heat would be left to count.
    pub fn new(
        formula: Formula,
        complete_heat: f64,
        co_yield: f64,
        soot_yield: f64,
    ) -> Result<Self, ReactionFault> {
        let Formula { c, h, o, n } = formula;
        let all = [c, h, o, n, complete_heat, co_yield, soot_yield];
        let mass = formula.molar_mass();
        if all.iter().any(|x| !x.is_finite() || *x < 0.0) || mass <= 0.0 || complete_heat <= 0.0 {
            return Err(ReactionFault::NotAFuel);
        }
        let carbon = c / mass;
        let co = co_yield / (CARBON + OXYGEN);
        let soot = soot_yield / CARBON;
        let co2 = carbon - co - soot;
        if co2 < -1e-12 * carbon.max(1.0) {
            return Err(ReactionFault::TooLittleCarbon {
                asked: (co + soot) * CARBON,
                held: carbon * CARBON,
            });
        }
        let co2 = co2.max(0.0);
        let water = 0.5 * h / mass;
        let oxygen = co2 + 0.5 * (co + water - o / mass);
        if oxygen <= 0.0 {
            return Err(ReactionFault::NoOxygenNeeded);
        }
        let heat = complete_heat - co_yield * CO_HEAT - soot_yield * SOOT_HEAT;
        if heat <= 0.0 {
            return Err(ReactionFault::NoHeatLeft);
        }
        let oxygen_mass = oxygen * 2.0 * OXYGEN;
        Ok(Self {
            oxygen: oxygen_mass,
            carbon_dioxide: co2 * (CARBON + 2.0 * OXYGEN),
            water: water * (2.0 * HYDROGEN + OXYGEN),
            carbon_monoxide: co_yield,
            soot: soot_yield,
            nitrogen: n / mass * NITROGEN,
            heat,
            heat_per_oxygen: heat / oxygen_mass,
        })
    }
}

/// Heat per kg of oxygen when the volatiles burn completely to CO2 and H2O,
/// J/kg; most organic fuels give 13.1 MJ/kg within some per cent (Huggett
/// 1980). `complete_heat` in J per kg of volatiles.
///
/// # Errors
/// As [`Reaction::new`].
pub fn complete_heat_per_oxygen(
    formula: Formula,
    complete_heat: f64,
) -> Result<f64, ReactionFault> {
    Reaction::new(formula, complete_heat, 0.0, 0.0).map(|reaction| reaction.heat_per_oxygen)
}

/// Heat released by fuel that burns inside a layer, W.
///
/// `Q = I dHc / t_mix * m_F m_Ox / (m_F + m_Ox)`, `m_Ox = m_O2 / s`: fuel
/// `fuel_kg`, oxygen `oxygen_kg`, `oxygen_per_fuel` s in kg/kg, `heat` dHc in
/// J/kg, `mixing_time` in s, `ignition` I from 0 to 1 (an autoignition
/// [`super::smooth::window`] or a pilot flame). The harmonic form goes to zero
/// with either reactant, so that neither can turn negative. Zero for amounts,
/// times or ratios of zero or below. Own closure; no published source.
#[must_use]
pub fn layer_burning(
    fuel_kg: f64,
    oxygen_kg: f64,
    oxygen_per_fuel: f64,
    heat: f64,
    mixing_time: f64,
    ignition: f64,
) -> f64 {
    if fuel_kg <= 0.0 || oxygen_kg <= 0.0 || oxygen_per_fuel <= 0.0 || mixing_time <= 0.0 {
        return 0.0;
    }
    let burnable = oxygen_kg / oxygen_per_fuel;
    ignition * heat / mixing_time * fuel_kg * burnable / (fuel_kg + burnable)
}
