"""Exact surface temperatures of a semi-infinite solid heated from t = 0.

Carslaw and Jaeger 1959: constant flux q, T = 2 q sqrt(t/(pi k rho c));
gas stepped by dT with coefficient h,
T/dT = 1 - exp(b^2) erfc(b), b = h sqrt(t/(k rho c)).
Prints the rows used in tests/verify_conduction.rs.
"""
import numpy as np
from scipy.special import erfcx

linings = {"gypsum": (0.16, 790.0, 900.0), "concrete": (1.6, 2200.0, 840.0)}
for name, (k, rho, c) in linings.items():
    effusivity = np.sqrt(k * rho * c)
    for t in (5.0, 10.0, 30.0, 60.0, 120.0):
        flux = 2 * 10e3 * np.sqrt(t / np.pi) / effusivity
        convection = 500.0 * (1 - erfcx(30.0 * np.sqrt(t) / effusivity))
        print(f"{name} {t:5.0f} s  flux {flux:.4f} K  convection {convection:.4f} K")
