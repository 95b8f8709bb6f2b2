"""Total emissivities of water vapour and carbon dioxide after Leckner 1972
(Combustion and Flame 19:33), in the form of Modest, Radiative Heat Transfer,
table 10.4 (coefficients from memory), at 1 bar total pressure.

Prints the rows used in tests/formula_emissivity.rs: temperature K, path
x partial pressure in bar m of CO2 and H2O, eps of CO2 alone, of H2O alone, and
of both with the overlap taken off.
"""
import math

WATER = [[-2.2118, -1.1987, 0.035596],
         [0.85667, 0.93048, -0.14391],
         [-0.10838, -0.17156, 0.045915]]
DIOXIDE = [[-3.9893, 2.7669, -2.1081, 0.39163],
           [1.2710, -1.1090, 1.0195, -0.21897],
           [-0.23678, 0.19731, -0.19544, 0.044644]]


def single(c, t, pl_cm, pressure_factor):
    tau, lam = t / 1000, math.log10(pl_cm)
    e0 = math.exp(sum(cji * tau**j * lam**i for i, row in enumerate(c) for j, cji in enumerate(row)))
    a, b, pe, lam_max = pressure_factor
    lam = max(lam, 0.5)
    return e0 * (1 - (a - 1) * (1 - pe) / (a + b - 1 + pe) * math.exp(-c_of(c) * (lam_max - lam) ** 2))


def c_of(c):
    return 0.5 if c is WATER else 1.47


def water(t, x, length):
    tau = t / 1000
    a = 2.144 if tau < 0.75 else 1.888 - 2.053 * math.log10(tau)
    pe = 1 + 2.56 * x / math.sqrt(tau)
    lam_max = math.log10(13.2 * tau**2)
    return single(WATER, t, 100 * x * length, (a, 1.10 / tau**1.4, pe, lam_max))


def dioxide(t, x, length):
    tau = t / 1000
    pe = 1 + 0.28 * x
    lam_max = math.log10(0.054 / tau**2 if tau < 0.7 else 0.225 * tau**2)
    return single(DIOXIDE, t, 100 * x * length, (1 + 0.1 / tau**1.45, 0.23, pe, lam_max))


def overlap(xc, xw, length):
    zeta = xw / (xw + xc)
    lam = math.log10(100 * (xw + xc) * length)
    if lam <= 0:
        return 0.0
    return (zeta / (10.7 + 101 * zeta) - 0.0089 * zeta**10.4) * lam**2.76


if __name__ == "__main__":
    for t in (400, 600, 900, 1200, 1500):
        for xc, xw in ((0.08, 0.16), (0.10, 0.10), (0.03, 0.03)):
            for length in (0.5, 2.0):
                c, w = dioxide(t, xc, length), water(t, xw, length)
                both = c + w - overlap(xc, xw, length)
                print(f"({t}.0, {xc}, {xw}, {length}, {both:.3f}),  // {c:.3f} {w:.3f}")
