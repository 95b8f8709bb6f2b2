"""Second version of the single-room model, written from docs/method.md alone.

Section numbers in the comments are those of docs/method.md. SI units. One room, one item, one door to
the open air, leakage over the height. Slow and plain on purpose: it is there to be compared with.
"""

from math import exp, log1p, pi, sqrt, tanh

import numpy as np
from scipy.optimize import brentq

from properties import (CO2, FUEL, GRAVITY, H2O, O2, RU, SIGMA, SOOT, Gas, Lining, Reaction, entrained,
                        gas_emissivity, min8, outside_fractions, parallel, plume, sphere_share, step)


class Layer:
    """Section 2: what follows from masses and a volume."""

    def __init__(self, gas, mass, volume, pressure):
        self.mass = mass
        self.total = mass.sum()
        moles = mass * gas.moles_per_mass
        self.moles = moles.sum()
        self.x = moles / self.moles
        self.y = mass / self.total
        self.volume = volume
        self.t = pressure * volume / (self.moles * RU)
        self.density = self.total / volume
        self.r = self.moles * RU / self.total
        self.h_species = gas.enthalpy(self.t)
        self.cp = float(self.y @ gas.capacity(self.t))
        self.h = float(self.y @ self.h_species)


REGULARISATION = 1e-3  # Pa, of the orifice law
SOFTNESS = 1000.0  # W/m2, of softplus


def band_mean(d1, d2):
    """Mean of f(d) over a band (section 4)."""
    e2 = REGULARISATION**2
    if abs(d2 - d1) < 1e-5 * (abs(d1) + abs(d2) + REGULARISATION):
        d = (d1 + d2) / 2
        return abs(d) / (d * d + e2)**.25
    f1 = 2 / 3 * (d1 * d1 + e2)**.75
    f2 = 2 / 3 * (d2 * d2 + e2)**.75
    return abs(f2 - f1) / abs(d2 - d1)


class Model:
    """State: V_u, upper masses, lower masses, item (tau, m, F, E, X_b), lining nodes."""

    def __init__(self, case):
        self.case = case
        self.gas = Gas(case["fuel"])
        self.reaction = Reaction(case["fuel"])
        room = case["room"]
        self.w, self.l, self.height = room["width"], room["length"], room["height"]
        self.floor_area = self.w * self.l
        self.perimeter = 2 * (self.w + self.l)
        self.volume = self.floor_area * self.height
        self.pressure = case["open_air"]["pressure"]
        self.t_start = room["temperature"]
        self.x_out = outside_fractions(case["open_air"])
        self.outside = self.air_layer(1.0, case["open_air"]["temperature"])
        self.ceiling = Lining(case["ceiling"], room["behind"])
        self.wall = Lining(case["walls"], room["behind"])
        self.floor = Lining(case["floor"], room["behind"])
        door = case["door"]
        step = self.height / 4
        self.leaf = np.array([door["width"] * max(min(door["head"], (n + 1) * step) - max(door["sill"], n * step), 0.0)
                              for n in range(4)])
        self.bare = np.maximum(self.perimeter * step - self.leaf, .05 * self.perimeter * step)
        self.clear = lambda t: 0.0
        self.strip_area = self.bare + self.leaf
        self.last_pressure = 0.0
        self.item0 = 15
        self.nodes0 = 20

    def air_layer(self, volume, temperature):
        moles = self.pressure * volume / (RU * temperature)
        return Layer(self.gas, moles * self.x_out * self.gas.molar, volume, self.pressure)

    def start(self):
        item, fuel = self.case["item"], self.case["fuel"]
        v_u = 4e-3 * self.volume
        upper = self.air_layer(v_u, self.t_start).mass
        lower = self.air_layer(self.volume - v_u, self.t_start).mass
        self.mass0 = (1 - fuel["residue_share"]) * item["mass"]
        nodes = np.full(self.ceiling.nodes + 4 * self.wall.nodes + self.floor.nodes, self.t_start)
        return np.concatenate([[v_u], upper, lower,
                               [0.0, self.mass0, 1.0, 0.0, self.x_out[O2]], nodes])

    # -- parts -----------------------------------------------------------------------------------

    def layers(self, s):
        held = min(max(s[0], 1e-3 * self.volume), .999 * self.volume)
        u = Layer(self.gas, s[1:8], held, self.pressure)
        lo = Layer(self.gas, s[8:15], self.volume - held, self.pressure)
        guard = 2e-3
        u.available = step((s[0] / self.volume - guard) / (4 * guard))
        lo.available = step(((self.volume - s[0]) / self.volume - guard) / (4 * guard))
        return u, lo, lo.volume / self.floor_area

    def linings(self, s):
        at = self.nodes0
        out = []
        for lining in [self.ceiling] + [self.wall] * 4 + [self.floor]:
            out.append(s[at:at + lining.nodes])
            at += lining.nodes
        return out

    def shares_above(self, z):
        quarter = self.height / 4
        return [min(max(((i + 1) * quarter - z) / quarter, 0.0), 1.0) for i in range(4)]

    def flame_height(self, heat):
        if heat <= 0:
            return 0.0
        base = sqrt(4 * heat / (pi * self.case["fuel"]["release_per_area"]))
        return max(.235 * (heat / 1000)**.4 - 1.02 * base, 0.0)

    def burning_factor(self, x, t):
        t_cr = 1700.0
        if t >= t_cr:
            limit = 0.0
        else:
            th = (t_cr - t) / (t_cr - 293)
            limit = self.case["fuel"]["x20"] * (1 + 8.5e-4 * (t_cr - 1700)) * th * (1 + .19 * (1 - th))
        return (1 + tanh((x - limit) / .01)) / 2

    def radiation(self, u, z, surfaces, open_area_u, open_area_w):
        """Section 9: the grey enclosure. Order c, u, w, f."""
        w, le, h = self.w, self.l, self.height
        area = self.floor_area
        au, aw = self.perimeter * (h - z), self.perimeter * z
        a, b, c = parallel(w, le, h - z), parallel(w, le, z), parallel(w, le, h)
        f = np.array([
            [0, 1 - a, a - c, c],
            [area * (1 - a) / au, 1 - 2 * area * (1 - a) / au,
             area * ((1 - a) - (b - c)) / au, area * (b - c) / au],
            [area * (a - c) / aw, area * ((1 - a) - (b - c)) / aw,
             1 - 2 * area * (1 - b) / aw, area * (1 - b) / aw],
            [c, b - c, 1 - b, 0]])
        path = 3.6 * u.volume / (2 * area + au)
        eps_g = gas_emissivity(u.t, u.x[CO2], u.x[H2O], path)
        k = 1300 * u.t * (u.mass[SOOT] / u.volume / 1800)
        eps = 1 - (1 - eps_g) * exp(-k * path)
        t = np.full((4, 4), 1 - eps)
        t[2:, 2:] = 1.0
        above = self.shares_above(z)
        t_out = self.outside.t
        # parts of a surface: (area, emissivity, own emission)
        wall_e = self.wall.emissivity
        strips = [wall_e * SIGMA * x[0]**4 for x in surfaces[1:5]]

        def whole(parts):
            total = sum(p[0] for p in parts)
            return (sum(p[0] * p[1] for p in parts) / total, sum(p[0] * p[2] for p in parts) / total, total)

        upper = [(a * s, 1 - wall_e, e) for a, s, e in zip(self.strip_area, above, strips)]
        lower = [(a * (1 - s), 1 - wall_e, e) for a, s, e in zip(self.strip_area, above, strips)]
        out_e = SIGMA * t_out**4
        upper += [(open_area_u, 0.0, out_e), (1e-9, 1.0, 0.0)]
        lower += [(open_area_w, 0.0, out_e), (1e-9, 1.0, 0.0)]
        ru, eu, sum_u = whole(upper)
        rw, ew, sum_w = whole(lower)
        ec = self.ceiling.emissivity * SIGMA * surfaces[0][0]**4
        ef = self.floor.emissivity * SIGMA * surfaces[5][0]**4
        emission = np.array([ec, eu, ew, ef])
        reflect = np.array([1 - self.ceiling.emissivity, ru, rw, 1 - self.floor.emissivity])
        matrix = np.eye(4) - f * t * reflect[None, :]
        right = (f * (t * emission[None, :] + (1 - t) * SIGMA * u.t**4)).sum(axis=1)
        g = np.linalg.solve(matrix, right)
        return dict(g=g, matrix=matrix, eps=eps, au=au, aw=aw, stretch_u=au / sum_u, stretch_w=aw / sum_w,
                    above=above, out_e=out_e)

    def flame_incident(self, rad, heat, z_f, z):
        w, le, h = self.w, self.l, self.height
        ceiling = sphere_share(w, le, h - z_f)
        floor = sphere_share(w, le, z_f)
        plane = sphere_share(w, le, max(abs(z - z_f), 1e-6))
        above = 1 - plane if z_f >= z else plane
        shares = np.array([ceiling, max(above - ceiling, 0.0), max(1 - above - floor, 0.0), floor])
        shares /= shares.sum()
        s = min(max((z_f - z) / (h - z), 0.0), 1.0)
        through = np.array([1 - rad["eps"]] * 2 + [1 - rad["eps"] * s] * 2)
        areas = np.array([self.floor_area, rad["au"], rad["aw"], self.floor_area])
        return heat * shares * through / areas

    def bands(self, sill, head, p, u, lo, z):
        """(height from, to, pressure differences at both ends), cut where needed (section 4)."""
        cuts = [sill, head]
        if sill < z < head:
            cuts.insert(1, z)

        def difference(at):
            inside = p - GRAVITY * (lo.density * min(at, z) + u.density * max(at - z, 0.0))
            return inside + GRAVITY * self.outside.density * at

        out = []
        for z1, z2 in zip(cuts[:-1], cuts[1:]):
            d1, d2 = difference(z1), difference(z2)
            if d1 * d2 < 0:
                zero = z1 + (z2 - z1) * d1 / (d1 - d2)
                out += [(z1, zero, d1, 0.0), (zero, z2, 0.0, d2)]
            else:
                out.append((z1, z2, d1, d2))
        return out

    def flows(self, p, u, lo, z, clear):
        """Net rates from openings: species and enthalpy of both layers; door flows (sections 4, 5)."""
        d_u, d_l = np.zeros(7), np.zeros(7)
        h_u = h_l = 0.0
        door, leak = self.case["door"], self.case["leakage"]
        report = dict(door_in=0.0, door_out=0.0)
        openings = [(0.0, self.height, leak["discharge"] * leak["area"] / self.height, 1.0)]
        if clear > 0:
            openings.append((door["sill"], door["head"], door["discharge"] * clear, 0.0))
        reference = lo.available * lo.t + (1 - lo.available) * u.t
        out = self.outside
        for sill, head, width, leak_share in openings:
            rising = falling = heat_rising = heat_falling = 0.0
            moment = jet = 0.0
            for z1, z2, d1, d2 in self.bands(sill, head, p, u, lo, z):
                mean = band_mean(d1, d2) * width * (z2 - z1)
                middle = (z1 + z2) / 2
                if d1 + d2 > 0:
                    # out: the layer of the band, by its availability, and the other for the rest
                    own, other = (u, lo) if middle > z else (lo, u)
                    m = mean * sqrt(2 * own.density)
                    report["door_out"] += m * (1 - leak_share)
                    for layer, part in ((own, own.available), (other, 1 - own.available)):
                        if layer is u:
                            d_u -= m * part * u.y
                            h_u -= m * part * u.h
                        else:
                            d_l -= m * part * lo.y
                            h_l -= m * part * lo.h
                else:
                    m = mean * sqrt(2 * out.density)
                    report["door_in"] += m * (1 - leak_share)
                    up = step((out.t - reference) / 10)
                    to_upper = leak_share * (middle > z) + (1 - leak_share) * up
                    d_u += m * to_upper * out.y
                    h_u += m * to_upper * out.h
                    d_l += m * (1 - to_upper) * out.y
                    h_l += m * (1 - to_upper) * out.h
                    free = m * (1 - leak_share)
                    rising += free * up
                    falling += free * (1 - up)
                    heat_rising += free * up * out.cp * max(out.t - lo.t, 0)
                    heat_falling += free * (1 - up) * out.cp * max(u.t - out.t, 0)
                    moment += free * middle
                    jet += free
            if jet > 0:
                mean_height = moment / jet
                e = entrained(rising, heat_rising, max(z - mean_height, 0), lo.t) * lo.available
                d_u += e * lo.y
                d_l -= e * lo.y
                h_u += e * lo.h
                h_l -= e * lo.h
                e = entrained(falling, heat_falling, max(mean_height - z, 0), u.t) * u.available
                d_l += e * u.y
                d_u -= e * u.y
                h_l += e * u.h
                h_u -= e * u.h
        return d_u, d_l, h_u, h_l, report

    def growth(self, layer, d, heat):
        """Section 2: volume growth at constant pressure."""
        moles = float(d @ self.gas.moles_per_mass)
        return (layer.t * RU * moles + layer.r / layer.cp * (heat - float(d @ layer.h_species))) / self.pressure

    # -- the item --------------------------------------------------------------------------------

    def item(self, s, u, lo, z, g_floor):
        """Section 7."""
        case, fuel = self.case["item"], self.case["fuel"]
        tau, m, flamed, ember, x_b = s[self.item0:self.item0 + 5]
        held = min(max(flamed, 0.0), 1.0)
        r = max(m, 0.0) / (.3 * self.mass0)
        burnout = r / (1 + r**4)**.25 / ((1 / .3) / (1 + (1 / .3)**4)**.25)
        free = min(case["growth"] * tau * tau, case["peak"]) * burnout
        r_x = max(x_b, 0.0) / self.x_out[O2]
        z_s = case["surface_height"]
        q_o = free * held * r_x**2
        m_a = 3 * q_o / 3.03e6
        w_low = lo.available * (min8(plume(q_o, z - z_s), m_a) / m_a if m_a > 0 else 1.0)
        x_zone = w_low * lo.x[O2] + (1 - w_low) * u.x[O2]
        t_zone = w_low * lo.t + (1 - w_low) * u.t
        factor = self.burning_factor(x_b, t_zone)
        hot = step((t_zone - 723.15) / 150)
        q = w_low * g_floor + (1 - w_low) * SIGMA * u.t**4 - SIGMA * self.t_start**4
        x = max(q, 0.0) / fuel["doubling_flux"]
        extra = x / (1 + (x / 1.5)**4)**.25
        over = q - fuel["critical_flux"]
        s_g = (max(over, 0.0) + SOFTNESS * log1p(exp(-abs(over) / SOFTNESS))) / fuel["doubling_flux"]
        g_e = (1 - held) * .02 * max(ember, 0.0) * max(x_b, 0.0) / (max(x_b, 0.0) + .03)
        d_f = free * (held * (r_x**2 + extra) + (1 - held) * s_g * held / (held + .05))
        given = free * (held * (r_x**2 + extra) + (1 - held) * s_g + g_e)
        f0 = .005
        d_flamed = (factor * (1 - flamed) * (flamed**2 / (flamed + f0) + .05 * ember + hot
                                             - f0 * flamed / (flamed + f0)) / 20
                    - (1 - factor) * flamed / 10)
        rates = np.array([held * (r_x**2 + extra), -given / self.reaction.heat, d_flamed,
                          flamed * (1 - ember) / 60 - (1 - flamed) * ember / 600, (x_zone - x_b) / 4])
        # burning at the item
        p_f = plume(d_f, z - z_s)
        p = p_f * lo.available
        p_in = max(plume(d_f, self.height - z_s) - p_f, 0.0) + (p_f - p)
        q_e = free * g_e
        e_o = self.reaction.per_oxygen
        q_l = min8(d_f + w_low * q_e, p * lo.y[O2] * e_o)
        s_u = self.burning_factor(u.x[O2], u.t)
        q_u = min8((d_f + w_low * q_e - q_l) * s_u, p_in * u.y[O2] * e_o)
        q_ember = (1 - w_low) * q_e * u.y[O2] / (u.y[O2] + .02)
        return dict(rates=rates, d_f=d_f, given=given, plume=p, heat=q_l + q_u + q_ember, flamed=held)

    # -- everything ------------------------------------------------------------------------------

    def evaluate(self, t, s):
        u, lo, z = self.layers(s)
        surfaces = self.linings(s)
        clear = self.clear(t)
        self.strip_area = self.bare + self.leaf * (1 - clear / self.case["door"]["width"])
        door = self.case["door"]
        open_above = clear * max(door["head"] - max(z, door["sill"]), 0.0)
        open_below = clear * (door["head"] - door["sill"]) - open_above
        rad = self.radiation(u, z, surfaces, open_above, open_below)
        item = self.item(s, u, lo, z, rad["g"][3])
        z_s = self.case["item"]["surface_height"]
        flame = self.flame_height(item["d_f"])
        z_f = min(max(z_s + flame / 2, .02 * self.height), .9 * self.height)
        incident = self.flame_incident(rad, self.case["fuel"]["radiant_share"] * item["heat"], z_f, z)
        g = rad["g"] + np.linalg.solve(rad["matrix"], incident)

        d_u, d_l = np.zeros(7), np.zeros(7)
        h_u = h_l = 0.0
        # plume, volatiles, burning at the item: all react in the upper layer
        d_u += item["plume"] * lo.y
        d_l -= item["plume"] * lo.y
        h_u += item["plume"] * lo.h + item["heat"]
        h_l -= item["plume"] * lo.h
        d_u[FUEL] += item["given"] / self.reaction.heat
        d_u += item["heat"] / self.reaction.heat * self.reaction.made
        # section 8
        heat = item["heat"]
        pilot = step((z_s + flame - z) / .5 + .5) * item["flamed"] / (item["flamed"] + .05)
        for layer, d, piloted in ((u, d_u, pilot * self.burning_factor(u.x[O2], u.t)), (lo, d_l, 0.0)):
            lit = 1 - (1 - step((layer.t - 723.15) / 150)) * (1 - piloted)
            want = max(layer.y[FUEL], 0.0) * self.reaction.oxygen
            have = layer.y[O2]
            if lit > 0 and want > 0 and have > 0:
                oxygen = lit * layer.total * want * have / ((want + have) * 5)
                d += oxygen / self.reaction.oxygen * self.reaction.made
                burned = oxygen * self.reaction.per_oxygen
                heat += burned
                if layer is u:
                    h_u += burned
                else:
                    h_l += burned
        # surfaces (sections 9 and 10)
        up, low = self.height - z, z
        c_u, c_l = 15 * up / (up + .02), 10 * low / (low + .02)
        lining_rates = []
        gained = 0.0

        def absorbed(eps, irradiation, t_surface):
            return eps * (irradiation - SIGMA * t_surface**4)

        t_c, t_f = surfaces[0][0], surfaces[5][0]
        rad_c = absorbed(self.ceiling.emissivity, g[0], t_c)
        rad_f = absorbed(self.floor.emissivity, g[3], t_f)
        conv_c, conv_f = c_u * (u.t - t_c), c_l * (lo.t - t_f)
        gained += self.floor_area * (rad_c + rad_f)
        h_u -= self.floor_area * conv_c
        h_l -= self.floor_area * conv_f
        lining_rates.append(self.ceiling.rate(surfaces[0], rad_c + conv_c))
        wall_q = wall_area = wall_t = 0.0
        for nodes, share, area in zip(surfaces[1:5], rad["above"], self.strip_area):
            t_w = nodes[0]
            radiant = (share * rad["stretch_u"] * absorbed(self.wall.emissivity, g[1], t_w)
                       + (1 - share) * rad["stretch_w"] * absorbed(self.wall.emissivity, g[2], t_w))
            from_u = share * c_u * (u.t - t_w)
            from_l = (1 - share) * c_l * (lo.t - t_w)
            gained += area * radiant
            h_u -= area * from_u
            h_l -= area * from_l
            wall_q += area * from_u
            wall_area += share * area
            wall_t += share * area * t_w
            lining_rates.append(self.wall.rate(nodes, radiant + from_u + from_l))
        lining_rates.append(self.floor.rate(surfaces[5], rad_f + conv_f))
        gained += open_above * rad["stretch_u"] * (g[1] - rad["out_e"])
        gained += open_below * rad["stretch_w"] * (g[2] - rad["out_e"])
        h_u -= gained
        # wall-cooled downflow
        excess = u.t - lo.t
        if excess > 0 and wall_q > 0 and wall_area > 0:
            share = min(max(u.t - wall_t / wall_area, 0) * excess / (excess**2 + 400), 1)
            m = u.available * step(excess / 10) * share * wall_q * excess / (u.cp * (excess**2 + 400))
            d_u -= m * u.y
            d_l += m * u.y
            arrives = m * float(u.y @ lo.h_species)
            h_u -= arrives
            h_l += arrives
        if excess < 0:
            rate = step(-excess / 5) * u.available * lo.available * min(u.volume, lo.volume) / 10
            mu, ml = rate * u.density, rate * lo.density
            d_u += ml * lo.y - mu * u.y
            d_l += mu * u.y - ml * lo.y
            h_u += ml * lo.h - mu * u.h
            h_l += mu * u.h - ml * lo.h

        # section 3: the pressure that lets the layers fill the room
        def residual(p):
            fu, fl, eu, el, _ = self.flows(p, u, lo, z, clear)
            return self.growth(u, d_u + fu, h_u + eu) + self.growth(lo, d_l + fl, h_l + el)

        p = self.find_pressure(residual)
        fu, fl, eu, el, report = self.flows(p, u, lo, z, clear)
        d_u += fu
        d_l += fl
        h_u += eu
        h_l += el
        rates = np.concatenate([[self.growth(u, d_u, h_u)], d_u, d_l, item["rates"]] + lining_rates)
        report.update(temperature_upper=u.t, temperature_lower=lo.t, interface=z,
                      oxygen_upper=u.x[O2], oxygen_lower=lo.x[O2], heat_release=heat,
                      given_off=item["given"], flamed_share=s[self.item0 + 2], pressure=p,
                      plume=item["plume"], emissivity=rad["eps"], floor_irradiation=g[3])
        return rates, report

    def find_pressure(self, residual):
        p = self.last_pressure
        value = residual(p)
        if value != 0.0:
            width = max(.05 * abs(p), 1e-3)
            direction = 1.0 if value > 0 else -1.0
            other = p + direction * width
            while residual(other) * value > 0:
                p = other
                width *= 3
                other += direction * width
            p = brentq(residual, min(p, other), max(p, other), xtol=1e-11, rtol=1e-14)
        self.last_pressure = p
        return p

    def rates(self, t, s):
        return self.evaluate(t, s)[0]
