"""Heat capacity and enthalpy of air and of combustion products from CoolProp's
ideal-gas equations (CP0MASS of N2, O2, CO2, H2O, Ar; independent of the
polynomials in src/physics/gas.rs), mixed by mass. Enthalpy is the
integral of the heat capacity from 298.15 K.

Prints the rows used in tests/formula_gas.rs: T, cp J/kg/K, h kJ/kg.
"""
import CoolProp.CoolProp as CP
from scipy.integrate import quad

FLUIDS = {"N2": "Nitrogen", "O2": "Oxygen", "CO2": "CarbonDioxide",
          "H2O": "Water", "CO": "CarbonMonoxide", "Ar": "Argon"}
MASS = {"N2": 28.014, "O2": 31.998, "CO2": 44.009, "H2O": 18.015, "CO": 28.010, "Ar": 39.948}


def cp(moles, t):
    mass = sum(n * MASS[s] for s, n in moles.items())
    return sum(n * MASS[s] * CP.PropsSI("CP0MASS", "T", t, "P", 1000.0, FLUIDS[s])
               for s, n in moles.items()) / mass


def h(moles, t):
    return quad(lambda x: cp(moles, x), 298.15, t, epsabs=1.0)[0]


AIR = {"N2": 0.7808, "O2": 0.2095, "Ar": 0.0093, "CO2": 0.0004}


def burned(dioxide, water, oxygen):
    """Complete products of a fuel in just enough air, its argon included."""
    air = oxygen / AIR["O2"]
    return {"CO2": dioxide + air * AIR["CO2"], "H2O": water,
            "N2": air * AIR["N2"], "Ar": air * AIR["Ar"]}


MIXES = {
    "air": AIR,
    "methane burned in air": burned(1, 2, 2),
    "wood C6H10O5 burned in air": burned(6, 5, 6),
    "N2": {"N2": 1}, "O2": {"O2": 1}, "CO2": {"CO2": 1}, "H2O": {"H2O": 1}, "CO": {"CO": 1},
}
for name, moles in MIXES.items():
    rows = ", ".join(f"({t}.0, {cp(moles, t):.1f}, {h(moles, t) / 1e3:.2f})"
                     for t in (300, 400, 600, 800, 1000, 1200, 1500, 1800))
    mass = sum(n * MASS[s] for s, n in moles.items()) / sum(moles.values())
    print(f"{name} (molar mass {mass:.4f}): {rows}")
