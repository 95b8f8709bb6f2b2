//! Heat capacity and enthalpy of air and of combustion products.
//!
//! Rows (T in K, cp in J/kg/K, h in kJ/kg above 298.15 K) printed by
//! tests/reference/gas.py from CoolProp 8.0.0 ideal-gas equations of the single
//! gases, which are independent of the polynomials in use here.

use doorglow::physics::gas::{
    CO, CO2, FIRST_FUEL, GAS_CONSTANT, GasTable, H2O, MOLAR_MASS, N2, O2, REFERENCE_TEMPERATURE,
    SOOT, moist_air,
};

type Rows = [(f64, f64, f64); 8];

const AIR: Rows = [
    (300.0, 1004.8, 1.86),
    (400.0, 1013.4, 102.71),
    (600.0, 1051.1, 308.80),
    (800.0, 1098.7, 523.79),
    (1000.0, 1141.1, 747.92),
    (1200.0, 1174.7, 979.64),
    (1500.0, 1211.2, 1337.87),
    (1800.0, 1237.0, 1705.31),
];
const BURNED_METHANE: Rows = [
    (300.0, 1105.8, 2.05),
    (400.0, 1127.6, 113.68),
    (600.0, 1184.1, 344.59),
    (800.0, 1248.4, 587.84),
    (1000.0, 1307.9, 843.60),
    (1200.0, 1358.1, 1110.37),
    (1500.0, 1416.3, 1527.00),
    (1800.0, 1458.2, 1958.51),
];
const BURNED_WOOD: Rows = [
    (300.0, 1057.4, 1.96),
    (400.0, 1088.4, 109.24),
    (600.0, 1154.5, 333.44),
    (800.0, 1221.4, 571.12),
    (1000.0, 1280.2, 821.45),
    (1200.0, 1328.3, 1082.48),
    (1500.0, 1382.6, 1489.58),
    (1800.0, 1420.9, 1910.43),
];
const MONOXIDE: Rows = [
    (300.0, 1040.4, 1.92),
    (400.0, 1047.4, 106.24),
    (600.0, 1086.7, 319.19),
    (800.0, 1138.8, 541.76),
    (1000.0, 1184.5, 774.26),
    (1200.0, 1219.6, 1014.83),
    (1500.0, 1256.4, 1386.64),
    (1800.0, 1280.6, 1767.42),
];

fn close(value: f64, expected: f64, relative: f64) {
    assert!(
        (value - expected).abs() <= relative * expected.abs(),
        "{value} against {expected}, allowed {relative}"
    );
}

fn fractions(moles: &[(usize, f64)]) -> Vec<f64> {
    let mut y = [0.0; FIRST_FUEL];
    for (species, n) in moles {
        y[*species] = n * MOLAR_MASS[*species];
    }
    let total: f64 = y.iter().sum();
    y.iter().map(|m| m / total).collect()
}

fn held_against(rows: &Rows, y: &[f64]) {
    let table = GasTable::new(&[]);
    for (t, cp, h) in rows {
        close(table.mixture_heat_capacity(*t, y), *cp, 0.005);
        let value = table.mixture_enthalpy(*t, y);
        // At 300 K the enthalpy is a difference of two kelvin.
        close(value, h * 1e3, if *t < 350.0 { 0.01 } else { 0.005 });
    }
}

#[test]
fn formula_air_against_coolprop() {
    held_against(&AIR, &moist_air(0.0, FIRST_FUEL));
    let table = GasTable::new(&[]);
    // Molar mass of dry air 28.966 g/mol.
    let gas_constant = table.mixture_gas_constant(&moist_air(0.0, FIRST_FUEL));
    close(GAS_CONSTANT / gas_constant, 28.966e-3, 5e-4);
}

#[test]
fn formula_burned_gas_against_coolprop() {
    // Nitrogen with argon per oxygen of the air.
    let per_oxygen = 0.7901 / 0.2095;
    let methane = fractions(&[(CO2, 1.0), (H2O, 2.0), (N2, 2.0 * per_oxygen)]);
    held_against(&BURNED_METHANE, &methane);
    let wood = fractions(&[(CO2, 6.0), (H2O, 5.0), (N2, 6.0 * per_oxygen)]);
    held_against(&BURNED_WOOD, &wood);
    held_against(&MONOXIDE, &fractions(&[(CO, 1.0)]));
}

#[test]
fn formula_soot_has_the_heat_of_graphite_and_no_volume() {
    let table = GasTable::new(&[]);
    let soot = fractions(&[(SOOT, 1.0)]);
    // Cantera 3.2.0, graphite.yaml: 197.0, 981.9, 1932.6 kJ/kg.
    for (t, h) in [(500.0, 197.01e3), (1000.0, 981.91e3), (1500.0, 1932.62e3)] {
        close(table.mixture_enthalpy(t, &soot), h, 0.005);
    }
    assert_eq!(table.mixture_gas_constant(&soot), 0.0);
}

#[test]
fn formula_enthalpy_is_the_integral_of_the_heat_capacity() {
    let table = GasTable::new(&[(44.097e-3, [400.0, 4.2])]);
    for species in 0..table.len() {
        let mut y = vec![0.0; table.len()];
        y[species] = 1.0;
        assert!(table.mixture_enthalpy(REFERENCE_TEMPERATURE, &y).abs() < 1e-6);
        for t in [200.0, 260.0, 400.0, 999.0, 1000.0, 1001.0, 2000.0, 3600.0] {
            let step = 0.01;
            let slope = (table.mixture_enthalpy(t + step, &y)
                - table.mixture_enthalpy(t - step, &y))
                / (2.0 * step);
            close(slope, table.mixture_heat_capacity(t, &y), 2e-3);
        }
    }
}

#[test]
fn formula_all_enthalpies_at_once_agree_with_the_mixture() {
    let table = GasTable::new(&[(100e-3, [1200.0, 0.5])]);
    let masses = [3.0, 0.8, 0.1, 0.06, 0.01, 0.002, 0.05];
    let total: f64 = masses.iter().sum();
    let y: Vec<f64> = masses.iter().map(|m| m / total).collect();
    let mut h = vec![0.0; table.len()];
    let cp = table.enthalpies(850.0, &masses, &mut h);
    close(cp, table.mixture_heat_capacity(850.0, &y), 1e-14);
    let sum: f64 = h.iter().zip(&y).map(|(h, y)| h * y).sum();
    close(sum, table.mixture_enthalpy(850.0, &y), 1e-14);
}

#[test]
fn formula_moist_air_composition() {
    let y = moist_air(0.0115, FIRST_FUEL);
    close(y.iter().sum(), 1.0, 1e-14);
    let moles: f64 = y.iter().zip(MOLAR_MASS).map(|(y, m)| y / m).sum();
    close(y[H2O] / MOLAR_MASS[H2O] / moles, 0.0115, 1e-12);
    close(
        y[O2] / MOLAR_MASS[O2] / moles,
        0.2095 * (1.0 - 0.0115),
        1e-12,
    );
}
