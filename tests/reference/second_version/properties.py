"""Gas, reaction, plume, view factors, emissivity and conduction grid of the second version, written from
docs/method.md alone. Section numbers are those of docs/method.md. SI units."""

from math import atan, exp, log, pi, sqrt

import numpy as np
from scipy.optimize import brentq

RU = 8.314462618
SIGMA = 5.670374419e-8
GRAVITY = 9.81
N2, O2, CO2, H2O, CO, SOOT, FUEL = range(7)

# Section 1: a0..a4 below and above 1000 K.
LOW = np.array([
    [3.28923656, 1.39159487e-3, -3.91637635e-6, 5.57483178e-9, -2.41595560e-12],
    [3.78245636, -2.99673416e-3, 9.84730201e-6, -9.68129509e-9, 3.24372837e-12],
    [2.35677352, 8.98459677e-3, -7.12356269e-6, 2.45919022e-9, -1.43699548e-13],
    [4.19864056, -2.0364341e-3, 6.52040211e-6, -5.48797062e-9, 1.77197817e-12],
    [3.57953347, -6.1035368e-4, 1.01681433e-6, 9.07005884e-10, -9.04424499e-13],
    [-.310872072, 4.40353686e-3, 1.90394118e-6, -6.38546966e-9, 2.98964248e-12],
])
HIGH = np.array([
    [2.92159708, 1.47038878e-3, -5.61756562e-7, 9.97769009e-11, -6.67352577e-15],
    [3.28253784, 1.48308754e-3, -7.57966669e-7, 2.09470555e-10, -2.16717794e-14],
    [3.85746029, 4.41437026e-3, -2.21481404e-6, 5.23490188e-10, -4.72084164e-14],
    [3.03399249, 2.17691804e-3, -1.64072518e-7, -9.7041987e-11, 1.68200992e-14],
    [2.71518561, 2.06252743e-3, -9.98825771e-7, 2.30053008e-10, -2.03647716e-14],
    [1.45571829, 1.71702216e-3, -6.97562786e-7, 1.35277032e-10, -9.67590652e-15],
])
MOLAR = np.array([.0281551, .031998, .044009, .018015, .028010, .012011])
LOWEST, BREAK, HIGHEST, REFERENCE = 250.0, 1000.0, 3500.0, 298.15


def power_integral(t):
    return np.array([t, t**2 / 2, t**3 / 3, t**4 / 4, t**5 / 5])


def powers(t):
    return np.array([1.0, t, t**2, t**3, t**4])


class Gas:
    """Heat capacities and enthalpies of the seven species (section 1)."""

    def __init__(self, fuel):
        self.molar = np.append(MOLAR, fuel["vapour_molar_mass"])
        self.vapour = fuel["vapour_capacity"]
        self.specific = RU / MOLAR
        at_break = LOW @ (power_integral(BREAK) - power_integral(REFERENCE))
        self.high_offset = at_break - HIGH @ power_integral(BREAK)
        self.low_offset = -(LOW @ power_integral(REFERENCE))
        # moles per kg that take room: soot takes none
        self.moles_per_mass = 1.0 / self.molar
        self.moles_per_mass[SOOT] = 0.0

    def capacity(self, t):
        held = min(max(t, LOWEST), HIGHEST)
        table = LOW if held <= BREAK else HIGH
        a, b = self.vapour
        return np.append(self.specific * (table @ powers(held)), a + b * t)

    def enthalpy(self, t):
        held = min(max(t, LOWEST), HIGHEST)
        if held <= BREAK:
            value = LOW @ power_integral(held) + self.low_offset
        else:
            value = HIGH @ power_integral(held) + self.high_offset
        value = self.specific * value
        if held != t:
            table = LOW if held <= BREAK else HIGH
            value = value + self.specific * (table @ powers(held)) * (t - held)
        a, b = self.vapour
        fuel = a * (t - REFERENCE) + b * (t * t - REFERENCE * REFERENCE) / 2
        return np.append(value, fuel)


def outside_fractions(air):
    """Mole fractions of the open air (section 1)."""
    tc = 647.096
    t = 1 - air["temperature"] / tc
    series = (-7.85951783 * t + 1.84408259 * t**1.5 - 11.7866497 * t**3
              + 22.6807411 * t**3.5 - 15.9618719 * t**4 + 1.80122502 * t**7.5)
    saturation = 22.064e6 * exp(tc / air["temperature"] * series)
    water = air["relative_humidity"] * saturation / air["pressure"]
    x = np.zeros(7)
    x[O2] = .2095 * (1 - water)
    x[CO2] = .0004 * (1 - water)
    x[H2O] = water
    x[N2] = 1 - x.sum()
    return x


class Reaction:
    """Burning of one kg of volatiles (section 1)."""

    def __init__(self, fuel):
        c, h, o, n = (fuel[k] for k in ("carbon", "hydrogen", "oxygen", "nitrogen"))
        mass = (12.011 * c + 1.008 * h + 15.999 * o + 14.007 * n) / 1000
        co = fuel["co_yield"] / MOLAR[CO]
        soot = fuel["soot_yield"] / .012011
        co2 = c / mass - co - soot
        h2o = h / mass / 2
        self.oxygen = (co2 + co / 2 + h2o / 2 - o / mass / 2) * MOLAR[O2]
        made = np.zeros(7)
        made[CO2] = co2 * MOLAR[CO2]
        made[CO] = fuel["co_yield"]
        made[SOOT] = fuel["soot_yield"]
        made[H2O] = h2o * MOLAR[H2O]
        made[N2] = n / mass * 14.007e-3  # by its own mass: no argon comes with it
        made[O2] = -self.oxygen
        made[FUEL] = -1
        self.made = made
        self.heat = fuel["heat_of_combustion"] - 10.1e6 * fuel["co_yield"] - 32.8e6 * fuel["soot_yield"]
        self.per_oxygen = self.heat / self.oxygen


def step(x):
    x = min(max(x, 0.0), 1.0)
    return x * x * (3 - 2 * x)


def min8(a, b):
    if a <= 0 or b <= 0:
        return 0.0
    small, large = min(a, b), max(a, b)
    return small / (1 + (small / large)**8)**.125


def plume(heat, z):
    """McCaffrey's plume (section 6), kg/s; heat in W."""
    if heat <= 0 or z <= 0:
        return 0.0
    q = heat / 1000
    x = z / q**.4
    if x < .08:
        m = .0109328456 * q * x**.566
    elif x < .20:
        m = .026 * q * x**.909
    else:
        m = .1271035768 * q * x**1.895
    return m * q / (q + .2)


def entrained(m, heat, distance, t):
    """Section 5: what a buoyant stream draws in over a distance, kg/s."""
    if m <= 0 or heat <= 0 or distance <= 0:
        return 0.0
    a = .071 * (heat / 1000)**(1 / 3) * (293.15 / t)
    z_v = (m / a)**.6
    return m * ((1 + distance / z_v)**(5 / 3) - 1) * heat / (heat + 200) * m / (m + 1e-4)


def parallel(w, length, d):
    """View factor of two equal parallel rectangles w x length at distance d."""
    if d <= 0:
        return 1.0
    x, y = w / d, length / d
    u, v = sqrt(1 + x * x), sqrt(1 + y * y)
    return 2 / (pi * x * y) * (log(u * v / sqrt(1 + x * x + y * y)) + x * v * atan(x / v)
                               + y * u * atan(y / u) - x * atan(x) - y * atan(y))


def sphere_share(w, length, d):
    return atan(w * length / (2 * d * sqrt(4 * d * d + w * w + length * length))) / pi


# Section 9: Smith, Shen and Friedman. Ratio, then rows k, b0..b3.
EMISSIVITY_RATIO = np.array([0, .5, 2 / 3, 1])
EMISSIVITY = np.array([
    [[.3966, .04334, 2.620e-4, -1.560e-7, 2.565e-11],
     [15.64, -.04814, 2.822e-4, -1.794e-7, 3.274e-11],
     [394.3, .05492, .1087e-4, -.3500e-7, .9123e-11]],
    [[.4303, .5150, -2.303e-4, .9779e-7, -1.494e-11],
     [7.055, .07749, 3.399e-4, -2.297e-7, 3.770e-11],
     [178.1, .1907, -1.824e-4, .5608e-7, -.5122e-11]],
    [[.4201, .6508, -5.551e-4, 3.029e-7, -5.353e-11],
     [6.516, -.02504, 6.112e-4, -3.882e-7, 6.528e-11],
     [131.9, .2718, -3.118e-4, 1.221e-7, -1.612e-11]],
    [[.4098, .5977, -5.119e-4, 3.042e-7, -5.564e-11],
     [6.325, .05677, 3.333e-4, -1.967e-7, 2.718e-11],
     [120.5, .1800, -2.334e-4, 1.008e-7, -1.454e-11]],
])


def gas_emissivity(t, x_co2, x_h2o, path):
    total = x_co2 + x_h2o
    if total <= 0:
        return 0.0
    ratio = x_h2o / total
    i = min(int(np.searchsorted(EMISSIVITY_RATIO, ratio, side="right")) - 1, 2)
    part = (ratio - EMISSIVITY_RATIO[i]) / (EMISSIVITY_RATIO[i + 1] - EMISSIVITY_RATIO[i])
    held = min(max(t, 300.0), 2400.0)
    table = (1 - part) * EMISSIVITY[i] + part * EMISSIVITY[i + 1]
    weight = table[:, 1:] @ np.array([1, held, held**2, held**3])
    return float(weight @ (1 - np.exp(-table[:, 0] * total * path)))


class Lining:
    """One-dimensional conduction (section 11)."""

    def __init__(self, lining, behind):
        self.emissivity = lining["emissivity"]
        self.behind = behind
        conductance, capacity = [], [0.0]
        first = 2.2
        for course in lining["courses"]:
            volume = course["density"] * course["capacity"]
            root = sqrt(course["conductivity"] / volume)
            for cell in cells(course["thickness"] / root, first):
                dx = cell * root
                conductance.append(course["conductivity"] / dx)
                capacity[-1] += .44 * volume * dx
                capacity.append(.56 * volume * dx)
                last = cell
            first = max(2.2, 1.3 * last)
        self.conductance = np.array(conductance)
        self.capacity = np.array(capacity)
        self.nodes = len(capacity)

    def rate(self, t, flux):
        """dT/dt of the nodes for a flux (W/m2) into the heated face."""
        between = self.conductance * (t[:-1] - t[1:])
        gain = np.zeros(self.nodes)
        gain[0] = flux
        gain[:-1] -= between
        gain[1:] += between
        gain[-1] -= 10 * (t[-1] - self.behind)
        return gain / self.capacity


def cells(span, first):
    n, total = 1, 1.0
    while first * total < span:
        total += 1.3**n
        n += 1
    if n * first >= span:
        return [span / n] * n
    growth = brentq(lambda g: first * sum(g**i for i in range(n)) - span, 1.0, 1.3, xtol=1e-15)
    return [first * growth**i for i in range(n)]
