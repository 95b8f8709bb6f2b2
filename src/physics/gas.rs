//! Ideal-gas mixture of N2, O2, CO2, H2O, CO, soot (mass only) and fuel
//! vapours: heat capacity and sensible enthalpy from published polynomials.
//!
//! Sensible enthalpies are zero at [`REFERENCE_TEMPERATURE`]. Polynomials
//! (NASA form, `cp/R = a0 + a1 T + a2 T^2 + a3 T^3 + a4 T^4` in two ranges
//! split at 1000 K) for the gases: coefficients of the GRI-Mech 3.0 thermodynamic
//! set (Smith et al. 1999, after Kee, Rupley and Miller 1987 and Burcat), for
//! graphite as soot: McBride, Gordon and Reno 1993, NASA TM-4513. Outside
//! 250..3500 K the heat capacity is held at its value at the edge.

/// Universal gas constant, J/mol/K (CODATA 2018, exact).
pub const GAS_CONSTANT: f64 = 8.314_462_618;

/// Temperature at which sensible enthalpies are zero, K.
pub const REFERENCE_TEMPERATURE: f64 = 298.15;

/// Lowest temperature of the polynomials as used, K.
pub const LOWEST_TEMPERATURE: f64 = 250.0;

/// Highest temperature of the polynomials as used, K.
pub const HIGHEST_TEMPERATURE: f64 = 3500.0;

/// Split between the two ranges, K.
const RANGE_SPLIT: f64 = 1000.0;

/// Index of nitrogen (with argon) in a mixture.
pub const N2: usize = 0;
/// Index of oxygen.
pub const O2: usize = 1;
/// Index of carbon dioxide.
pub const CO2: usize = 2;
/// Index of water vapour.
pub const H2O: usize = 3;
/// Index of carbon monoxide.
pub const CO: usize = 4;
/// Index of soot.
pub const SOOT: usize = 5;
/// Index of the first fuel vapour.
pub const FIRST_FUEL: usize = 6;

/// Molar masses of the fixed species, kg/mol (IUPAC 2021 atomic masses).
///
/// Nitrogen stands for that of the air, with its 1.182 % of argon by moles;
/// pure N2 in its place would make air 0.4 % too light and its heat capacity
/// 0.5 % too high. The little nitrogen that fuels set free is taken for the
/// same.
pub const MOLAR_MASS: [f64; FIRST_FUEL] = [
    28.155_1e-3,
    31.998e-3,
    44.009e-3,
    18.015e-3,
    28.010e-3,
    12.011e-3,
];

/// `a0..a4` below and above 1000 K, in the order of the species indices; those
/// of nitrogen mixed with argon's 2.5.
const POLYNOMIALS: [[[f64; 5]; 2]; FIRST_FUEL] = [
    [
        [
            3.289_236_56,
            1.391_594_87e-3,
            -3.916_376_35e-6,
            5.574_831_78e-9,
            -2.415_955_60e-12,
        ],
        [
            2.921_597_08,
            1.470_388_78e-3,
            -5.617_565_62e-7,
            9.977_690_09e-11,
            -6.673_525_77e-15,
        ],
    ],
    [
        [
            3.782_456_36,
            -2.996_734_16e-3,
            9.847_302_01e-6,
            -9.681_295_09e-9,
            3.243_728_37e-12,
        ],
        [
            3.282_537_84,
            1.483_087_54e-3,
            -7.579_666_69e-7,
            2.094_705_55e-10,
            -2.167_177_94e-14,
        ],
    ],
    [
        [
            2.356_773_52,
            8.984_596_77e-3,
            -7.123_562_69e-6,
            2.459_190_22e-9,
            -1.436_995_48e-13,
        ],
        [
            3.857_460_29,
            4.414_370_26e-3,
            -2.214_814_04e-6,
            5.234_901_88e-10,
            -4.720_841_64e-14,
        ],
    ],
    [
        [
            4.198_640_56,
            -2.036_434_1e-3,
            6.520_402_11e-6,
            -5.487_970_62e-9,
            1.771_978_17e-12,
        ],
        [
            3.033_992_49,
            2.176_918_04e-3,
            -1.640_725_18e-7,
            -9.704_198_7e-11,
            1.682_009_92e-14,
        ],
    ],
    [
        [
            3.579_533_47,
            -6.103_536_8e-4,
            1.016_814_33e-6,
            9.070_058_84e-10,
            -9.044_244_99e-13,
        ],
        [
            2.715_185_61,
            2.062_527_43e-3,
            -9.988_257_71e-7,
            2.300_530_08e-10,
            -2.036_477_16e-14,
        ],
    ],
    [
        [
            -0.310_872_072,
            4.403_536_86e-3,
            1.903_941_18e-6,
            -6.385_469_66e-9,
            2.989_642_48e-12,
        ],
        [
            1.455_718_29,
            1.717_022_16e-3,
            -6.975_627_86e-7,
            1.352_770_32e-10,
            -9.675_906_52e-15,
        ],
    ],
];

/// Heat capacity and enthalpy of one species, per kg.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Species {
    /// Coefficients of cp, J/kg/K^(n+1), below and above the split.
    heat_capacity: [[f64; 5]; 2],
    /// Coefficients of the enthalpy's Horner form (cp's divided by 1..5).
    enthalpy: [[f64; 5]; 2],
    /// Constant that makes the enthalpy zero at the reference and continuous.
    offset: [f64; 2],
}

fn horner(c: &[f64; 5], t: f64) -> f64 {
    c[0] + t * (c[1] + t * (c[2] + t * (c[3] + t * c[4])))
}

impl Species {
    /// From `cp` polynomials in J/kg/K.
    fn new(heat_capacity: [[f64; 5]; 2]) -> Self {
        let mut enthalpy = heat_capacity;
        for range in &mut enthalpy {
            for (n, c) in range.iter_mut().enumerate() {
                *c /= (n + 1) as f64;
            }
        }
        let integral = |range: usize, t: f64| t * horner(&enthalpy[range], t);
        let low = -integral(0, REFERENCE_TEMPERATURE);
        let high = integral(0, RANGE_SPLIT) + low - integral(1, RANGE_SPLIT);
        Self {
            heat_capacity,
            enthalpy,
            offset: [low, high],
        }
    }

    fn evaluate(&self, temperature: f64) -> (f64, f64) {
        let t = temperature.clamp(LOWEST_TEMPERATURE, HIGHEST_TEMPERATURE);
        let range = usize::from(t > RANGE_SPLIT);
        let cp = horner(&self.heat_capacity[range], t);
        let h = self.offset[range] + t * horner(&self.enthalpy[range], t);
        (h + cp * (temperature - t), cp)
    }
}

/// The species of a run: the six fixed ones, then one vapour per fuel.
#[derive(Debug, Clone, PartialEq)]
pub struct GasTable {
    species: Vec<Species>,
    inverse_molar_mass: Vec<f64>,
}

impl GasTable {
    /// Table for the given fuel vapours: molar mass (kg/mol) and `cp = a + b T`
    /// (J/kg/K, J/kg/K2) of each.
    pub fn new(vapours: &[(f64, [f64; 2])]) -> Self {
        let mut species: Vec<Species> = POLYNOMIALS
            .iter()
            .zip(MOLAR_MASS)
            .map(|(ranges, molar_mass)| {
                Species::new(ranges.map(|range| range.map(|a| a * GAS_CONSTANT / molar_mass)))
            })
            .collect();
        let mut inverse_molar_mass: Vec<f64> = MOLAR_MASS.iter().map(|m| 1.0 / m).collect();
        // Soot weighs but takes no room.
        inverse_molar_mass[SOOT] = 0.0;
        for (molar_mass, [a, b]) in vapours {
            species.push(Species::new([[*a, *b, 0.0, 0.0, 0.0]; 2]));
            inverse_molar_mass.push(1.0 / molar_mass);
        }
        Self {
            species,
            inverse_molar_mass,
        }
    }

    /// Number of species.
    pub fn len(&self) -> usize {
        self.species.len()
    }

    /// Never empty; here for the sake of `len`.
    pub fn is_empty(&self) -> bool {
        self.species.is_empty()
    }

    /// Moles per kg of each species, mol/kg; zero for soot.
    pub fn inverse_molar_mass(&self) -> &[f64] {
        &self.inverse_molar_mass
    }

    /// Sensible enthalpy (J/kg) of every species at a temperature (K), and the
    /// heat capacity (J/kg/K) of the mixture with the given masses (kg).
    ///
    /// Slices as long as [`GasTable::len`].
    pub fn enthalpies(&self, temperature: f64, masses: &[f64], enthalpies: &mut [f64]) -> f64 {
        let mut capacity = 0.0;
        let mut total = 0.0;
        for ((species, mass), out) in self.species.iter().zip(masses).zip(enthalpies) {
            let (h, cp) = species.evaluate(temperature);
            *out = h;
            capacity += mass * cp;
            total += mass;
        }
        capacity / total
    }

    /// Sensible enthalpy of a mixture, J/kg, from mass fractions.
    pub fn mixture_enthalpy(&self, temperature: f64, fractions: &[f64]) -> f64 {
        self.species
            .iter()
            .zip(fractions)
            .map(|(species, y)| y * species.evaluate(temperature).0)
            .sum()
    }

    /// Heat capacity of a mixture, J/kg/K, from mass fractions.
    pub fn mixture_heat_capacity(&self, temperature: f64, fractions: &[f64]) -> f64 {
        self.species
            .iter()
            .zip(fractions)
            .map(|(species, y)| y * species.evaluate(temperature).1)
            .sum()
    }

    /// Gas constant of a mixture, J/kg/K, from mass fractions.
    pub fn mixture_gas_constant(&self, fractions: &[f64]) -> f64 {
        GAS_CONSTANT
            * fractions
                .iter()
                .zip(&self.inverse_molar_mass)
                .map(|(y, m)| y * m)
                .sum::<f64>()
    }
}

/// Mass fractions of moist air, in the order of the species (fuel vapours
/// zero), from the mole fraction of water vapour; dry air as 20.95 % O2 by
/// volume, the rest N2 with argon, with a trace of CO2 (0.04 %).
pub fn moist_air(water: f64, species: usize) -> Vec<f64> {
    let mut moles = vec![0.0; species];
    let dry = 1.0 - water;
    moles[O2] = 0.2095 * dry;
    moles[CO2] = 0.0004 * dry;
    moles[N2] = dry - moles[O2] - moles[CO2];
    moles[H2O] = water;
    let mut masses = moles;
    for (mass, molar) in masses.iter_mut().zip(MOLAR_MASS) {
        *mass *= molar;
    }
    let total: f64 = masses.iter().sum();
    for mass in &mut masses {
        *mass /= total;
    }
    masses
}
