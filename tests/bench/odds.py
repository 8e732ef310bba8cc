"""The harbour plan drawn again and again by whole columns: the same model as the library's draws, written by hand over NumPy.

Reads from the standard input what `tests/bench/odds.rs` writes there (inputs with their keys, constants of the materials) and writes means,
standard deviations and seconds to the standard output. One column holds all draws of a number; nothing is looped over draws. States of carbon dioxide
follow from the equation of Span and Wagner (1996), with all its terms, by Newton's method on whole columns.

Every draw is the one that the library makes: the same keys, the same SplitMix64 finaliser.
"""

import json
import os
import sys
import time

# One thread on both sides.
for name in ("OMP_NUM_THREADS", "OPENBLAS_NUM_THREADS", "MKL_NUM_THREADS"):
    os.environ[name] = "1"

import numpy as np

R = 8.314462618
AIR_PA = 101325.0
NITROGEN_KG_M3 = AIR_PA * 0.0280134 / (R * 298.15)


# ---- draws

def uniform(key, draws):
    """Draw d of an input: SplitMix64 finaliser over a counter, then the middle of one of 2**52 cells."""
    with np.errstate(over="ignore"):
        z = np.uint64(key) + (draws + np.uint64(1)) * np.uint64(0x9E3779B97F4A7C15)
        z = (z ^ (z >> np.uint64(30))) * np.uint64(0xBF58476D1CE4E5B9)
        z = (z ^ (z >> np.uint64(27))) * np.uint64(0x94D049BB133111EB)
        z = z ^ (z >> np.uint64(31))
    return ((z >> np.uint64(12)).astype(np.float64) + 0.5) * 2.0**-52


class Inputs:
    """Inputs of one route by identity; columns are shared between routes, as the draws are."""

    def __init__(self, rows, seed, draws, known):
        self.rows, self.seed, self.draws, self.known = {r["identity"]: r for r in rows}, seed, draws, known

    def __call__(self, identity):
        row = self.rows[identity]
        if row["low"] is None:
            return row["central"]
        key = row["key"] ^ self.seed
        if key not in self.known:
            self.known[key] = row["low"] + (row["high"] - row["low"]) * uniform(key, self.draws)
        return self.known[key]

    def get(self, identity, otherwise=0.0):
        return self(identity) if identity in self.rows else otherwise


# ---- carbon dioxide: Span and Wagner, J. Phys. Chem. Ref. Data 25 (1996) 1509, table 31

TC, RHOC, RG = 304.1282, 0.0440098 * 10624.9063, 8.31451 / 0.0440098
IDEAL = [(1.99427042, 3.15163), (0.62105248, 6.1119), (0.41195293, 6.77708), (1.04028922, 11.32384), (0.08327678, 27.08792)]
POWER = [  # n, d, t, l
    (0.388568232032, 1, 0, 0), (2.93854759427, 1, 0.75, 0), (-5.5867188535, 1, 1, 0), (-0.767531995925, 1, 2, 0),
    (0.317290055804, 2, 0.75, 0), (0.548033158978, 2, 2, 0), (0.122794112203, 3, 0.75, 0), (2.16589615432, 1, 1.5, 1),
    (1.58417351097, 2, 1.5, 1), (-0.231327054055, 4, 2.5, 1), (0.0581169164314, 5, 0, 1), (-0.553691372054, 5, 1.5, 1),
    (0.489466159094, 5, 2, 1), (-0.0242757398435, 6, 0, 1), (0.0624947905017, 6, 1, 1), (-0.121758602252, 6, 2, 1),
    (-0.370556852701, 1, 3, 2), (-0.0167758797004, 1, 6, 2), (-0.11960736638, 4, 3, 2), (-0.0456193625088, 4, 6, 2),
    (0.0356127892703, 4, 8, 2), (-0.00744277271321, 7, 6, 2), (-0.00173957049024, 8, 0, 2), (-0.0218101212895, 2, 7, 3),
    (0.0243321665592, 3, 12, 3), (-0.0374401334235, 3, 16, 3), (0.143387157569, 5, 22, 4), (-0.134919690833, 5, 24, 4),
    (-0.0231512250535, 6, 16, 4), (0.0123631254929, 7, 24, 4), (0.00210583219729, 8, 8, 4), (-0.000339585190264, 10, 2, 4),
    (0.00559936517716, 4, 28, 5), (-0.000303351180556, 8, 14, 6),
]
GAUSS = [  # n, d, t, eta, beta, gamma
    (-213.654886883, 2, 1, 25.0, 325.0, 1.16), (26641.5691493, 2, 0, 25.0, 300.0, 1.19), (-24027.2122046, 2, 1, 25.0, 300.0, 1.19),
    (-283.41603424, 3, 3, 15.0, 275.0, 1.25), (212.472844002, 3, 3, 20.0, 275.0, 1.22),
]
CRITICAL = [  # n, a, b, B, C
    (-0.666422765408, 3.5, 0.875, 0.3, 10.0), (0.726086323499, 3.5, 0.925, 0.3, 10.0), (0.0550686686128, 3.0, 0.875, 1.0, 12.5),
]
A, BETA, D = 0.7, 0.3, 275.0


def powers(x, most):
    out = [np.ones_like(x)]
    for _ in range(most):
        out.append(out[-1] * x)
    return out


def residual(delta, tau, want_tau):
    """Residual Helmholtz energy: d/d delta and its second, and with `want_tau` the energy itself and d/d tau."""
    d_, t_ = powers(delta, 10), powers(tau, 28)
    quarter, half = np.sqrt(np.sqrt(tau)), np.sqrt(tau)
    fraction = {0.0: 1.0, 0.5: half, 0.75: half * quarter}
    fall = [None] + [np.exp(-d_[l]) for l in range(1, 7)]
    a = a_t = 0.0
    a_d, a_dd = np.zeros_like(delta), np.zeros_like(delta)
    for n, d, t, l in POWER:
        whole = int(t)
        term = n * d_[d] * t_[whole] * fraction[t - whole]
        if l:
            term = term * fall[l]
        inner = d - l * d_[l] if l else d
        a_d += term * inner
        a_dd += term * (inner * (inner - 1.0) - (l * l * d_[l] if l else 0.0))
        if want_tau:
            a = a + term
            a_t = a_t + term * t
    for n, d, t, eta, beta, gamma in GAUSS:
        term = n * d_[d] * t_[t] * np.exp(-eta * (delta - 1.0) ** 2 - beta * (tau - gamma) ** 2)
        inner = d - 2.0 * eta * delta * (delta - 1.0)
        a_d += term * inner
        a_dd += term * (inner * inner - d - 2.0 * eta * d_[2])
        if want_tau:
            a = a + term
            a_t = a_t + term * (t - 2.0 * beta * tau * (tau - gamma))
    a_d, a_dd, a_t = a_d / delta, a_dd / d_[2], a_t / tau
    off = (delta - 1.0) ** 2 + 1e-300
    for n, pa, b, B, C in CRITICAL:
        theta = (1.0 - tau) + A * off ** (0.5 / BETA)
        big = theta * theta + B * off**pa
        psi = np.exp(-C * off - D * (tau - 1.0) ** 2)
        big_d = (delta - 1.0) * (A * theta * 2.0 / BETA * off ** (0.5 / BETA - 1.0) + 2.0 * B * pa * off ** (pa - 1.0))
        big_dd = big_d / (delta - 1.0) + off * (
            4.0 * B * pa * (pa - 1.0) * off ** (pa - 2.0)
            + 2.0 * (A / BETA) ** 2 * off ** (1.0 / BETA - 2.0)
            + A * theta * 4.0 / BETA * (0.5 / BETA - 1.0) * off ** (0.5 / BETA - 2.0)
        )
        to_b = big**b
        b_d = b * to_b / big * big_d
        b_dd = b * (to_b / big * big_dd + (b - 1.0) * to_b / big**2 * big_d**2)
        psi_d = -2.0 * C * (delta - 1.0) * psi
        psi_dd = (2.0 * C * off - 1.0) * 2.0 * C * psi
        a_d = a_d + n * (to_b * (psi + delta * psi_d) + b_d * delta * psi)
        a_dd = a_dd + n * (to_b * (2.0 * psi_d + delta * psi_dd) + 2.0 * b_d * (psi + delta * psi_d) + b_dd * delta * psi)
        if want_tau:
            a = a + n * to_b * delta * psi
            b_t = -2.0 * theta * b * to_b / big
            a_t = a_t + n * delta * (b_t * psi - to_b * 2.0 * D * (tau - 1.0) * psi)
    return a, a_d, a_dd, a_t


def pressure(t, rho):
    """Pressure and its slope in density."""
    delta, tau = rho / RHOC, TC / t
    _, a_d, a_dd, _ = residual(delta, tau, False)
    return rho * RG * t * (1.0 + delta * a_d), RG * t * (1.0 + 2.0 * delta * a_d + delta**2 * a_dd)


def density(t, p, rho):
    """Density at a state, from a start on the right side, by Newton's method on whole columns."""
    t, p = np.broadcast_arrays(np.atleast_1d(t).astype(float), np.atleast_1d(p).astype(float))
    rho = np.full(t.shape, rho, dtype=float)
    for _ in range(40):
        found, slope = pressure(t, rho)
        step = (p - found) / slope
        rho = rho + step
        if np.max(np.abs(step) / rho) < 1e-11:
            return rho
    raise ArithmeticError("no density")


def energy(t, rho):
    """Enthalpy and entropy, 0 for the ideal gas at 298.15 K and 101 325 Pa."""
    delta, tau = rho / RHOC, TC / t
    a, a_d, _, a_t = residual(delta, tau, True)
    ideal = np.log(delta) + 8.37304456 - 3.70454304 * tau + 2.5 * np.log(tau)
    ideal_t = -3.70454304 + 2.5 / tau
    for n, theta in IDEAL:
        fall = np.exp(-theta * tau)
        ideal = ideal + n * np.log1p(-fall)
        ideal_t = ideal_t + n * theta * fall / (1.0 - fall)
    u = tau * (ideal_t + a_t)
    return RG * t * (1.0 + u + delta * a_d), RG * (u - ideal - a)


def after_pump(p, s, t):
    """Enthalpy at a pressure and an entropy: secant in temperature, each state by Newton's method, on whole columns."""
    rho = density(t, p, 950.0)
    h, here = energy(t, rho)
    step = np.full_like(t, 0.5)
    for _ in range(20):
        t_new = t + step
        rho = density(t_new, p, rho)
        h, new = energy(t_new, rho)
        slope = (new - here) / step
        t, here = t_new, new
        step = (s - here) / slope
        if np.max(np.abs(step)) < 1e-7:
            # h rises by T ds along the isobar
            return h + t * (s - here)
        step = np.where(np.abs(step) < 1e-9, 1e-9, step)
    raise ArithmeticError("no state behind the pump")


# ---- liquids

class Liquids:
    def __init__(self, given, inputs):
        self.of, self.pairs, self.x = given["materials"], given["pairs"], inputs

    def rho(self, name):
        return self.x(f"material/{name}/density")

    def volume(self, masses):
        return sum(kg / self.rho(name) for name, kg in masses.items())

    def poured(self, volume, shares):
        whole = sum(shares.values())
        return {name: volume * share * self.rho(name) / whole for name, share in shares.items()}

    def take_down(self, masses, wanted, t, steps):
        """Evaporates until a volume is left (Rayleigh), by the midpoint rule in ln V; returns what is left."""
        names = [n for n, kg in masses.items() if np.any(kg > 0.0)]
        m = {n: self.of[n]["molar_mass"] for n in names}
        n_ = [masses[n] / m[n] for n in names]
        v = [m[n] / self.rho(n) for n in names]
        pure = [self.of[n]["pure"][str(t)] * self.x(f"material/{n}/vapour pressure factor") for n in names]
        count = len(names)
        lam = [[1.0] * count for _ in names]
        for first, second, a12, b12, a21, b21 in self.pairs:
            if first in names and second in names:
                i, j = names.index(first), names.index(second)
                lam[i][j], lam[j][i] = np.exp(a12 + b12 / t), np.exp(a21 + b21 / t)

        def kappa(n):
            if count < 2:
                return pure
            total = sum(n)
            over = [1.0 / sum(n[j] * lam[k][j] for j in range(count)) for k in range(count)]
            # ln gamma_i = 1 - ln S_i - sum x_k Lambda_ki / S_k
            return [pure[i] * np.exp(1.0 - sum(n[k] * over[k] * lam[k][i] for k in range(count))) * over[i] * total for i in range(count)]

        def after(n, k, theta):
            return [a * np.exp(-b * theta) for a, b in zip(n, k)]

        def size(n):
            return sum(a * b for a, b in zip(n, v))

        volume = size(n_)
        fall = np.log(volume / wanted) / steps
        for i in range(steps):
            first = kappa(n_)
            leaving = sum(a * b * c for a, b, c in zip(v, n_, first))
            half = 0.5 * fall * volume / leaving
            middle = kappa(after(n_, first, half)) if count > 1 else first
            theta = 2.0 * half
            if i + 1 < steps:
                n_ = after(n_, middle, theta)
                volume = size(n_)
                fall = np.log(volume / wanted) / (steps - i - 1)
                continue
            for _ in range(40):
                end = after(n_, middle, theta)
                there = size(end)
                off = there / wanted - 1.0
                if np.max(np.abs(off)) < 1e-9:
                    break
                theta = theta + np.log1p(off) * there / sum(a * b * c for a, b, c in zip(v, end, middle))
            n_ = end
        return {name: a * m[name] for name, a in zip(names, n_)}


class Book:
    """What is bought, where it goes (kg for one extraction), electricity and water (J, kg for one extraction)."""

    def __init__(self):
        self.bought, self.hood, self.flammable, self.solids, self.marc, self.liquor = {}, {}, {}, {}, {}, {}
        self.joules = self.water_kg = self.computed = 0.0

    def put(self, place, masses, share=1.0):
        for name, kg in masses.items():
            place[name] = place.get(name, 0.0) + kg * share

    def buy(self, place, masses):
        self.put(self.bought, masses)
        self.put(place, masses)

    def move(self, from_, to, share):
        for name in list(from_):
            part = from_[name] * share
            from_[name] = from_[name] - part
            to[name] = to.get(name, 0.0) + part


def mass(masses):
    return sum(masses.values())


# ---- steps

def hold_up(b, liquids, x, at, agent_kg, to):
    share = x(f"{at}.hold_up") * agent_kg / liquids.volume(b.liquor)
    b.move(b.liquor, to, np.minimum(share, 1.0))


def rinse(b, liquids, x, at, shares, to):
    poured = liquids.poured(x(f"{at}.charge"), shares)
    b.put(b.bought, poured)
    loss = x(f"{at}.loss")
    b.put(b.hood, poured, loss)
    b.put(to, poured, 1.0 - loss)


def dry(b, liquids, x, at):
    agent = x(f"{at}.mass")
    b.buy(b.solids, {"sodium sulfate": agent})
    if "water" in b.liquor:
        there = b.liquor["water"]
        taken = np.minimum(x("material/sodium sulfate/water capacity") * agent, there)
        b.liquor["water"] = there - taken
        b.put(b.solids, {"water": taken})
    hold_up(b, liquids, x, at, agent, b.solids)


def concentrate(b, liquids, x, at, rotary, steps):
    t = x(f"{at}.temperature")
    left = liquids.take_down(b.liquor, x(f"{at}.to"), t, steps)
    gone = {name: b.liquor[name] - left.get(name, 0.0) for name in b.liquor}
    b.liquor = left
    if rotary:
        loss = x(f"{at}.loss")
        b.put(b.hood, gone, loss)
        b.put(b.flammable, gone, 1.0 - loss)
    else:
        b.put(b.hood, gone)
        b.buy(b.hood, {"nitrogen": x(f"{at}.gas_flow") * x(f"{at}.time") * NITROGEN_KG_M3})
    b.joules = b.joules + x(f"{at}.power") * x(f"{at}.time")


HALVES = {"n-hexane": 0.5, "acetone": 0.5}


def soxhlet(x, liquids, r):
    b, at = Book(), lambda s: f"workloads[0].routes[{r}].steps[{s}]"
    b.put(b.marc, {"sediment": x("workloads[0].feed.sediment")})
    b.buy(b.marc, {"sodium sulfate": x(f"{at(0)}.mass"), "cellulose thimble": x(f"{at(1)}.mass")})
    marc = mass(b.marc)
    b.buy(b.liquor, liquids.poured(x(f"{at(2)}.charge"), HALVES))
    b.move(b.liquor, b.hood, x(f'{at(2)}.measured["condenser loss"]') / mass(b.liquor))
    hold_up(b, liquids, x, at(2), marc, b.marc)
    b.joules = b.joules + x(f"{at(2)}.heater") * x(f"{at(2)}.time")
    b.water_kg = x(f"{at(2)}.cooling_water") * x(f"{at(2)}.time") * 1000.0
    rinse(b, liquids, x, at(3), HALVES, b.liquor)
    dry(b, liquids, x, at(4))
    concentrate(b, liquids, x, at(5), True, 10)
    concentrate(b, liquids, x, at(6), False, 4)
    rinse(b, liquids, x, at(7), {"acetone": 1.0}, b.flammable)
    b.buy(b.solids, {"autosampler vial": x(f"{at(8)}.mass")})
    return b, x(f"{at(9)}.mass")


def ultrasonic(x, liquids, r):
    b, at = Book(), lambda s: f"workloads[0].routes[{r}].steps[{s}]"
    b.put(b.marc, {"sediment": x(f"workloads[0].routes[{r}].feed.sediment")})
    b.buy(b.marc, {"sodium sulfate": x(f"{at(0)}.mass")})
    marc = mass(b.marc)
    b.buy(b.liquor, liquids.poured(3.0 * x(f"{at(1)}.charge"), HALVES))
    b.move(b.liquor, b.hood, x(f"{at(1)}.loss"))
    hold_up(b, liquids, x, at(1), marc, b.marc)
    b.joules = b.joules + 3.0 * x(f"{at(1)}.power") * x(f"{at(1)}.time")
    b.buy(b.marc, {"glass-fibre filter": x(f"{at(2)}.mass")})
    rinse(b, liquids, x, at(3), HALVES, b.liquor)
    dry(b, liquids, x, at(4))
    concentrate(b, liquids, x, at(5), True, 10)
    concentrate(b, liquids, x, at(6), False, 4)
    rinse(b, liquids, x, at(7), {"acetone": 1.0}, b.flammable)
    b.buy(b.solids, {"autosampler vial": x(f"{at(8)}.mass")})
    return b, x(f"{at(9)}.mass")


def pressurised(x, liquids, r):
    b, at = Book(), lambda s: f"workloads[0].routes[{r}].steps[{s}]"
    b.put(b.marc, {"sediment": x("workloads[0].feed.sediment")})
    b.buy(b.marc, {"diatomaceous earth": x(f"{at(0)}.dispersant_mass")})
    marc = mass(b.marc)
    volume = x(f"{at(0)}.cell") * (x(f"{at(0)}.void") + x(f"{at(0)}.flush")) + x(f"{at(0)}.lines")
    b.buy(b.liquor, liquids.poured(volume, HALVES))
    b.move(b.liquor, b.hood, x(f'{at(0)}.measured["carried off by the purge"]') / mass(b.liquor))
    hold_up(b, liquids, x, at(0), marc, b.marc)
    b.joules = b.joules + x(f"{at(0)}.power") * x(f"{at(0)}.time")
    b.buy(b.marc, {"cellulose filter paper": x(f"{at(1)}.mass")})
    rinse(b, liquids, x, at(2), HALVES, b.liquor)
    dry(b, liquids, x, at(3))
    concentrate(b, liquids, x, at(4), False, 8)
    rinse(b, liquids, x, at(5), HALVES, b.flammable)
    b.buy(b.solids, {"autosampler vial": x(f"{at(6)}.mass")})
    return b, x(f"{at(7)}.mass")


def supercritical(x, liquids, r):
    b, at = Book(), lambda s: f"workloads[0].routes[{r}].steps[{s}]"
    b.put(b.marc, {"sediment": x(f"workloads[0].routes[{r}].feed.sediment")})
    marc, vessel_kg, heptane = mass(b.marc), 0.0, {"n-heptane": 1.0}
    for s in range(3):
        of = lambda key: x(f"{at(s)}.{key}")
        t_m, p_m, t, p = of("meter_temperature"), of("meter_pressure"), of("temperature"), of("pressure")
        void = of("vessel") - marc / of("solid_density") - of("filler")
        rho = float(density(t, p, 400.0)[0])
        filled = max(void * rho - vessel_kg, 0.0)
        b.put(b.bought, {"carbon dioxide": filled})
        over, vessel_kg = max(vessel_kg - void * rho, 0.0), void * rho
        rho_m = density(t_m, p_m, 930.0)
        passed = of("flow") * of("time") * rho_m
        b.put(b.bought, {"carbon dioxide": passed})
        b.put(b.hood, {"carbon dioxide": passed + over})
        if s == 1:
            shares = {"methanol": of("cosolvent.methanol"), "water": of("cosolvent.water")}
            poured = liquids.poured(of("cosolvent_flow") * of("time"), shares)
            kept = of("cosolvent_kept")
            b.put(b.bought, poured)
            b.put(b.liquor, poured, kept)
            b.put(b.hood, poured, 1.0 - kept)
        b.buy(b.liquor, liquids.poured(of("rinse_volume"), heptane))
        if s == 2:
            b.put(b.hood, {"carbon dioxide": vessel_kg})
        # The circuit: chill, pump, preheat, expand and warm up at the vent.
        supply, _ = energy(of("supply_temperature"), density(of("supply_temperature"), p_m, 800.0))
        chilled, entropy = energy(t_m, rho_m)
        ideal = after_pump(p, entropy, t_m + 7e-7 * (p - p_m)) - chilled
        work = ideal / of("pump_efficiency")
        extractor, _ = energy(t, rho)
        vent, _ = energy(of("vent_temperature"), density(of("vent_temperature"), 101325.0, 1.8))
        cold = np.maximum(supply - chilled, 0.0)
        warm = np.maximum(chilled - supply, 0.0)
        heat = warm + (extractor - chilled - work) + (vent - extractor)
        b.computed = b.computed + (filled + passed) * (work / of("drive_efficiency") + cold / of("cop") + heat)
        b.joules = b.joules + of("power") * of("run_time")
    b.buy(b.marc, {"glass-fibre filter": x(f"{at(3)}.mass")})
    rinse(b, liquids, x, at(4), heptane, b.liquor)
    dry(b, liquids, x, at(5))
    concentrate(b, liquids, x, at(6), False, 6)
    rinse(b, liquids, x, at(7), {"acetone": 1.0}, b.flammable)
    b.buy(b.solids, {"autosampler vial": x(f"{at(8)}.mass")})
    return b, x(f"{at(9)}.mass")


# ---- figures of a year

SOLVENTS = ("n-hexane", "acetone", "n-heptane", "methanol")


def figures(b, gloves, x, liquids, r):
    b.put(b.flammable, b.liquor)
    b.put(b.solids, b.marc)
    results, samples = x("workloads[0].results_per_year"), x("workloads[0].batch.samples")
    batches = results * (1.0 + x("workloads[0].repeats")) / samples
    runs = results * (1.0 + x("workloads[0].repeats")) + x("workloads[0].batch.controls") * batches
    path = f"workloads[0].routes[{r}]"
    gloves = gloves * batches
    price = lambda name: x(f'site.money.prices["{name}"]' if " " in name or name == "glass-fibre filter" else f"site.money.prices.{name}")
    cost = gloves * price("nitrile glove")
    for name, kg in b.bought.items():
        by_volume = name in SOLVENTS
        cost = cost + kg * runs * price(name) / (liquids.rho(name) if by_volume else 1.0)
    containers = np.ceil(liquids.volume(b.flammable) * runs / (0.02 * 0.9) - 1e-9)
    solids = mass(b.solids) * runs + gloves
    waste = mass(b.flammable) * runs + solids
    cost = cost + x("site.money.disposal.flammable") * containers
    cost = cost + x("site.money.disposal.flammable + 1") * x("site.money.pick_ups") + x("site.money.disposal.solids") * solids
    time_s = x(f"{path}.time.attended") * runs + x(f"{path}.time.attended_batch") * batches
    joules = b.joules * runs
    cost = cost + time_s * x("site.money.labour_hour") + joules * x("site.electricity.price")
    cost = cost + b.water_kg * runs * 1e-3 * x("site.money.cooling_water")
    cost = cost + x(f"{path}.money.service") + x.get(f"{path}.money.rent")
    there = x("site.hours.attended") + (x("site.hours.unattended") if r in (0, 2) else 0.0)
    needed = np.ceil(runs * x(f"{path}.time.run") / x.get(f"{path}.time.at_once", 1.0) / there - 1e-9)
    to_buy = np.maximum(np.ceil(needed - x.get(f"{path}.time.instruments") - 1e-9), 0.0)
    once = to_buy * x.get(f"{path}.money.instrument") + x.get(f"{path}.money.validation")
    to_air = {name: kg for name, kg in b.hood.items() if name in SOLVENTS}
    burnt = {name: kg for name, kg in b.flammable.items() if name in SOLVENTS}
    carbon = lambda masses: sum(kg * liquids.of[name]["co2"] for name, kg in masses.items()) * runs
    out = {
        "air.solvents": mass(to_air) * runs,
        "waste.total.mass": waste,
        "energy.electricity": joules,
        "cost.year": cost,
        "cost.once": once,
        "climate.electricity": joules * x("site.electricity.climate"),
        "climate.oxidised": carbon(to_air),
        "climate.incineration": carbon(burnt),
    }
    if "carbon dioxide" in b.bought:
        out["co2.vented"] = b.hood["carbon dioxide"] * runs
        out["energy.electricity.computed"] = b.computed * runs
    return out


def drawn(given):
    draws = np.arange(given["draws"], dtype=np.uint64)
    known, out = {}, []
    for r, (route, rows) in enumerate(zip((soxhlet, ultrasonic, pressurised, supercritical), given["routes"])):
        x = Inputs(rows, given["seed"], draws, known)
        liquids = Liquids(given, x)
        out.append(figures(*route(x, liquids, r), x, liquids, r))
    return out


def main():
    given = json.load(sys.stdin)
    best, found = float("inf"), None
    for _ in range(3):
        start = time.process_time()
        found = drawn(given)
        best = min(best, time.process_time() - start)
    routes = [{k: [float(np.mean(v)), float(np.std(v, ddof=1)) if np.ndim(v) else 0.0] for k, v in f.items()} for f in found]
    json.dump({"numpy": np.__version__, "seconds": best, "routes": routes}, sys.stdout)


main()
