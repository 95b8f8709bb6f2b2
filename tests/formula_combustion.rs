//! Burning of a kilogram of volatiles, layer burning and the flame limit.

#![allow(clippy::unwrap_used)]

use doorglow::physics::combustion::{
    CARBON, Formula, HYDROGEN, NITROGEN, OXYGEN, Reaction, ReactionFault, complete_heat_per_oxygen,
    layer_burning,
};
use doorglow::physics::extinction::{burning_factor, limiting_oxygen};

const METHANE: Formula = Formula {
    c: 1.0,
    h: 4.0,
    o: 0.0,
    n: 0.0,
};
const PROPANE: Formula = Formula {
    c: 3.0,
    h: 8.0,
    o: 0.0,
    n: 0.0,
};
const CELLULOSE: Formula = Formula {
    c: 6.0,
    h: 10.0,
    o: 5.0,
    n: 0.0,
};
const POLYURETHANE: Formula = Formula {
    c: 1.0,
    h: 1.8,
    o: 0.30,
    n: 0.05,
};

fn close(value: f64, expected: f64, relative: f64) {
    assert!(
        (value - expected).abs() <= relative * expected.abs(),
        "{value} against {expected}, allowed {relative}"
    );
}

#[test]
fn formula_mass_and_atoms_balance_exactly() {
    let cases = [
        (METHANE, 50.0e6, 0.0, 0.0),
        (PROPANE, 46.4e6, 0.005, 0.024),
        (CELLULOSE, 16.09e6, 0.004, 0.015),
        (POLYURETHANE, 26.2e6, 0.042, 0.198),
    ];
    for (formula, heat, co, soot) in cases {
        let made = Reaction::new(formula, heat, co, soot).unwrap();
        let products =
            made.carbon_dioxide + made.water + made.carbon_monoxide + made.soot + made.nitrogen;
        close(products, 1.0 + made.oxygen, 1e-14);
        let mass = formula.molar_mass();
        let carbon = CARBON
            * (made.carbon_dioxide / (CARBON + 2.0 * OXYGEN)
                + made.carbon_monoxide / (CARBON + OXYGEN))
            + made.soot;
        close(carbon, formula.c * CARBON / mass, 1e-14);
        let water = made.water / (2.0 * HYDROGEN + OXYGEN);
        close(2.0 * water, formula.h / mass, 1e-14);
        assert!((made.nitrogen - formula.n * NITROGEN / mass).abs() < 1e-16);
        close(made.heat_per_oxygen, made.heat / made.oxygen, 1e-15);
    }
}

#[test]
fn formula_complete_burning_of_known_fuels() {
    // Methane: 3.989 kg O2, 2.743 kg CO2, 2.246 kg H2O per kg (textbook).
    let methane = Reaction::new(METHANE, 50.03e6, 0.0, 0.0).unwrap();
    close(methane.oxygen, 3.989, 1e-3);
    close(methane.carbon_dioxide, 2.743, 1e-3);
    close(methane.water, 2.246, 1e-3);
    // Heat per kg of oxygen: Huggett 1980, 13.1 MJ/kg +-5 %; methane 12.54,
    // propane 12.80, cellulose 13.59 (from memory).
    close(methane.heat_per_oxygen, 12.54e6, 2e-3);
    close(
        complete_heat_per_oxygen(PROPANE, 46.36e6).unwrap(),
        12.80e6,
        5e-3,
    );
    close(
        complete_heat_per_oxygen(CELLULOSE, 16.09e6).unwrap(),
        13.59e6,
        2e-3,
    );
    // Polyurethane of this formula: 389.5 kJ/mol O2, i.e. 12.17 MJ/kg.
    close(
        complete_heat_per_oxygen(POLYURETHANE, 26.2e6).unwrap(),
        12.17e6,
        5e-3,
    );
}

#[test]
fn formula_soot_and_co_keep_their_share_of_the_heat() {
    let made = Reaction::new(PROPANE, 46.36e6, 0.005, 0.024).unwrap();
    close(made.heat, 46.36e6 - 0.005 * 10.1e6 - 0.024 * 32.8e6, 1e-14);
    // The oxygen not used by soot and CO carries about the same heat each.
    close(made.heat_per_oxygen, 12.80e6, 0.01);
}

#[test]
fn formula_impossible_fuels_are_errors() {
    let too_much = Reaction::new(METHANE, 50e6, 0.5, 0.7);
    assert!(matches!(
        too_much,
        Err(ReactionFault::TooLittleCarbon { .. })
    ));
    let oxidiser = Formula {
        c: 1.0,
        h: 0.0,
        o: 3.0,
        n: 0.0,
    };
    assert_eq!(
        Reaction::new(oxidiser, 1e6, 0.0, 0.0),
        Err(ReactionFault::NoOxygenNeeded)
    );
    let nothing = Formula {
        c: 0.0,
        h: 0.0,
        o: 0.0,
        n: 0.0,
    };
    assert_eq!(
        Reaction::new(nothing, 1e6, 0.0, 0.0),
        Err(ReactionFault::NotAFuel)
    );
    assert_eq!(
        Reaction::new(METHANE, f64::NAN, 0.0, 0.0),
        Err(ReactionFault::NotAFuel)
    );
    assert_eq!(
        Reaction::new(METHANE, 1e6, 0.0, 0.2),
        Err(ReactionFault::NoHeatLeft)
    );
    assert!(!ReactionFault::NoHeatLeft.to_string().is_empty());
    // All carbon to soot is the edge of what is allowed.
    let edge = Reaction::new(
        METHANE,
        50e6,
        0.0,
        METHANE.c * CARBON / METHANE.molar_mass(),
    );
    assert!(edge.unwrap().carbon_dioxide.abs() < 1e-12);
}

#[test]
fn formula_layer_burning_is_limited_by_the_scarcer_reactant() {
    // 1 kg fuel, oxygen for 1 kg: half of either per mixing time.
    close(layer_burning(1.0, 3.0, 3.0, 20e6, 5.0, 1.0), 2e6, 1e-14);
    close(layer_burning(1e-3, 3.0, 3.0, 20e6, 5.0, 1.0), 4e3, 2e-3);
    close(layer_burning(1.0, 3e-3, 3.0, 20e6, 5.0, 1.0), 4e3, 2e-3);
    assert_eq!(layer_burning(0.0, 0.0, 3.0, 20e6, 5.0, 1.0), 0.0);
    assert_eq!(layer_burning(1.0, 1.0, 3.0, 20e6, 5.0, 0.0), 0.0);
}

#[test]
fn formula_limiting_oxygen_of_wood_with_gas_temperature() {
    // Closed form and equilibrium flames (wood C6H10O5, 1700 K), per cent.
    let rows = [
        (20.0, 13.5, 13.5),
        (200.0, 12.0, 12.1),
        (400.0, 10.3, 10.4),
        (600.0, 8.5, 8.7),
        (800.0, 6.6, 6.8),
    ];
    for (celsius, closed, equilibrium) in rows {
        let limit = 100.0 * limiting_oxygen(0.1347, 1700.0, celsius + 273.15);
        assert!((limit - closed).abs() < 0.06, "{celsius}: {limit}");
        // 0.12 % is the fit's largest error, 0.05 the rounding of the row.
        assert!(
            (limit - equilibrium).abs() < 0.12 + 0.06,
            "{celsius}: {limit}"
        );
    }
}

#[test]
fn formula_limiting_oxygen_at_20_and_at_the_ends() {
    for x20 in [0.1351, 0.1312, 0.1316, 0.1347, 0.1413] {
        close(limiting_oxygen(x20, 1700.0, 293.0), x20, 1e-12);
    }
    assert_eq!(limiting_oxygen(0.1351, 1700.0, 1700.0), 0.0);
    assert_eq!(limiting_oxygen(0.1351, 1700.0, 2500.0), 0.0);
    assert_eq!(limiting_oxygen(0.1351, 200.0, 150.0), 0.0);
    // 100 K of critical temperature is 8.5 % of the limit at 20 °C.
    close(
        limiting_oxygen(0.1351, 1600.0, 293.0),
        0.1351 * 0.915,
        1e-12,
    );
}

#[test]
fn formula_burning_factor_passes_smoothly() {
    close(burning_factor(0.135, 0.135, 0.01), 0.5, 1e-15);
    assert!(burning_factor(0.2095, 0.1351, 0.01) > 0.999_999);
    assert!(burning_factor(0.10, 0.1351, 0.01) < 1e-3);
    assert_eq!(burning_factor(0.2, 0.1, 0.0), 1.0);
    assert_eq!(burning_factor(0.05, 0.1, 0.0), 0.0);
}
