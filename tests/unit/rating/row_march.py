"""A rating worked out the slow way: one bank, one row after the other, plain numbers, properties from libraries.

Nothing here knows the service. Formulas are written from their publications: Gnielinski 1979 and Gaddis &
Gnielinski 1985 across the tubes, Gnielinski 1976 and Churchill 1977 along them, Cavallini et al. 2006 and
Mueller-Steinhagen & Heck 1986 for condensing. A row takes one coefficient at its mean state; the service takes
one a cell.
"""

from collections.abc import Callable
from dataclasses import dataclass
from math import exp, log, pi, sqrt

from CoolProp.CoolProp import HAPropsSI, PropsSI
from iapws import IAPWS97
from iapws._iapws import _ThCond, _Viscosity

R_GAS = 8.314462618


@dataclass(frozen=True)
class Props:
    """Density, heat capacity, conductivity, viscosity; SI."""

    rho: float
    cp: float
    k: float
    mu: float

    @property
    def pr(self) -> float:
        """Prandtl number."""
        return self.cp * self.mu / self.k


Fluid = Callable[[float, float], Props]


def dry_air(t: float, p: float) -> Props:
    """Air after Lemmon and others."""
    return Props(*(PropsSI(name, "T", t, "P", p, "Air") for name in ("D", "C", "L", "V")))


def moist_air(w: float) -> Fluid:
    """Air with ``w`` kg of vapour a kg of dry air: HAPropsSI, and Wilke's and Mason-Saxena's mixing."""
    x = (w / 18.015) / (w / 18.015 + 1.0 / 28.966)

    def at(t: float, p: float) -> Props:
        rho = (1.0 + w) / HAPropsSI("V", "T", t, "P", p, "W", w)
        cp = HAPropsSI("C", "T", t, "P", p, "W", w) / (1.0 + w)
        thin = 1e-6  # kg/m3, transport of the vapour at vanishing density
        mu = (PropsSI("V", "T", t, "P", 1e3, "Air"), _Viscosity(thin, t))
        k = (PropsSI("L", "T", t, "P", 1e3, "Air"), _ThCond(thin, t))
        m, y = (28.966, 18.015), (1.0 - x, x)

        def phi(i: int, j: int) -> float:
            value: float = (1.0 + sqrt(mu[i] / mu[j]) * (m[j] / m[i]) ** 0.25) ** 2 / sqrt(
                8.0 * (1.0 + m[i] / m[j])
            )
            return value

        weight = [sum(y[j] * phi(i, j) for j in (0, 1)) for i in (0, 1)]
        return Props(
            rho,
            cp,
            sum(y[i] * k[i] / weight[i] for i in (0, 1)),
            sum(y[i] * mu[i] / weight[i] for i in (0, 1)),
        )

    return at


def water(t: float, p: float) -> Props:
    """Liquid water, IAPWS-IF97."""
    at = IAPWS97(T=t, P=p / 1e6)
    return Props(at.rho, at.cp * 1e3, at.k, at.mu)


@dataclass(frozen=True)
class Tubes:
    """A bank; half a tube gap at the walls."""

    staggered: bool
    d: float
    wall: float
    st: float
    sl: float
    rows: int
    across: int
    length: float
    k_metal: float
    roughness: float = 4.5e-5

    @property
    def bore(self) -> float:
        """Inner diameter."""
        return self.d - 2.0 * self.wall

    @property
    def row_area(self) -> float:
        """Outer surface of a row."""
        return pi * self.d * self.length * self.across

    @property
    def face(self) -> float:
        """Section of the duct."""
        return self.across * self.st * self.length

    @property
    def free(self) -> float:
        """Narrowest section, the transverse gaps (the marches' banks have wider diagonals)."""
        return self.across * (self.st - self.d) * self.length

    @property
    def wall_resistance(self) -> float:
        """Of the tube wall on its outer surface."""
        return self.d * log(self.d / self.bore) / (2.0 * self.k_metal)


def across_coefficient(bank: Tubes, row: int, g_max: float, here: Props, ratio: float) -> float:
    """Gnielinski 1979 in a gas at one row; ``ratio`` is bulk over surface temperature."""
    a, b = bank.st / bank.d, bank.sl / bank.d
    psi = 1.0 - pi / (4.0 * a) if b >= 1.0 else 1.0 - pi / (4.0 * a * b)
    length = 0.5 * pi * bank.d
    re = g_max * (bank.free / bank.face) * length / (psi * here.mu)
    lam = 0.664 * sqrt(re) * here.pr ** (1.0 / 3.0)
    tur = 0.037 * re**0.8 * here.pr / (1.0 + 2.443 * re**-0.1 * (here.pr ** (2.0 / 3.0) - 1.0))
    nu = 0.3 + sqrt(lam * lam + tur * tur)
    if bank.rows >= 10 or row > 1:
        nu *= (
            1.0 + 2.0 / (3.0 * b)
            if bank.staggered
            else 1.0 + 0.7 / psi**1.5 * (b / a - 0.3) / (b / a + 0.7) ** 2
        )
    if ratio < 1.0:
        nu *= ratio**0.12
    return nu * here.k / length


def across_loss(bank: Tubes, g_max: float, here: Props, mu_wall: float) -> float:
    """Gaddis & Gnielinski 1985 loss coefficient of one row, transverse gap."""
    a, b = bank.st / bank.d, bank.sl / bank.d
    re, z = g_max * bank.d / here.mu, mu_wall / here.mu
    lam = 280.0 * pi * ((sqrt(b) - 0.6) ** 2 + 0.75) / ((4.0 * a * b - pi) * a**1.6) / re
    lam *= z ** (0.57 / ((4.0 * a * b / pi - 1.0) * re) ** 0.25)
    few = max(1.0 / bank.rows - 0.1, 0.0) / a**2
    if bank.staggered:
        f = 2.5 + 1.2 / (a - 0.85) ** 1.08 + 0.4 * (b / a - 1.0) ** 3 - 0.01 * (a / b - 1.0) ** 3
        tur, onset = f / re**0.25, 1.0 - exp(-(re + 200.0) / 1000.0)
    else:
        f = 0.22 + 1.2 * (1.0 - 0.94 / b) ** 0.6 / (a - 0.85) ** 1.3
        f = f * 10.0 ** (0.47 * (b / a - 1.5)) + 0.03 * (a - 1.0) * (b - 1.0)
        tur, onset = f / re ** (0.1 * b / a), 1.0 - exp(-(re + 1000.0) / 2000.0)
    value: float = lam + (tur * z**0.14 + few) * onset
    return value


@dataclass
class March:
    """What came out: heat to the gas by row, its temperature and pressure behind the last row, drops."""

    heat: list[float]
    outlet: float
    drop: float
    inside_outlet: float = 0.0
    inside_drop: float = 0.0
    flow: float = 0.0


def _gas_row(
    bank: Tubes,
    gas: Fluid,
    row: int,
    m: float,
    t_in: float,
    p_in: float,
    surface: Callable[[float], tuple[float, float]],
) -> tuple[float, float, float]:
    """One row: outlet temperature, heat, pressure behind it.

    ``surface`` gives from the gas-side coefficient the driving inside temperature and the overall coefficient.
    """
    t_out, wall = t_in, surface(50.0)[0]
    heat = 0.0
    for _ in range(60):
        mean = 0.5 * (t_in + t_out)
        here = gas(mean, p_in)
        h = across_coefficient(bank, row, m / bank.free, here, mean / wall)
        driver, u = surface(h)
        new = driver - (driver - t_in) * exp(-u * bank.row_area / (m * here.cp))
        heat = m * here.cp * (new - t_in)
        # the surface at the mean heat of the row
        wall = mean + heat / (h * bank.row_area)
        done = abs(new - t_out) < 1e-10
        t_out = new
        if done:
            break
    mean = 0.5 * (t_in + t_out)
    here = gas(mean, p_in)
    friction = (
        across_loss(bank, m / bank.free, here, gas(wall, p_in).mu) * (m / bank.free) ** 2 / (2.0 * here.rho)
    )
    momentum = (m / bank.face) ** 2 * (1.0 / gas(t_out, p_in - friction).rho - 1.0 / gas(t_in, p_in).rho)
    return t_out, heat, p_in - friction - momentum


def held_surface(bank: Tubes, gas: Fluid, m: float, t_in: float, p_in: float, surface: float) -> March:
    """The bank with its outer surface at one temperature."""
    t, p, heat = t_in, p_in, []
    for row in range(1, bank.rows + 1):
        t, q, p = _gas_row(bank, gas, row, m, t, p, lambda h: (surface, h))
        heat.append(q)
    return March(heat, t, p_in - p)


# --- steam inside -----------------------------------------------------------------------------------------


def _cavallini(x: float, g: float, d: float, dt: float, liquid: IAPWS97, vapour: IAPWS97) -> float:
    latent = (vapour.h - liquid.h) * 1e3
    pr = liquid.cp * 1e3 * liquid.mu / liquid.k
    x = min(max(x, 0.01), 0.99)
    h_lo = 0.023 * (g * d / liquid.mu) ** 0.8 * pr**0.4 * liquid.k / d
    x_tt = ((1.0 - x) / x) ** 0.9 * (vapour.rho / liquid.rho) ** 0.5 * (liquid.mu / vapour.mu) ** 0.1
    j = x * g / sqrt(9.80665 * d * vapour.rho * (liquid.rho - vapour.rho))
    j_t = ((7.5 / (4.3 * x_tt**1.111 + 1.0)) ** -3 + 2.6**-3) ** (-1.0 / 3.0)
    h_a = h_lo * (
        1.0
        + 1.128
        * x**0.817
        * (liquid.rho / vapour.rho) ** 0.3685
        * (liquid.mu / vapour.mu) ** 0.2363
        * (1.0 - vapour.mu / liquid.mu) ** 2.144
        * pr**-0.1
    )
    if j > j_t:
        sheared: float = h_a
        return sheared
    film = liquid.k**3 * liquid.rho * (liquid.rho - vapour.rho) * 9.80665 * latent / (liquid.mu * d * dt)
    h_s = 0.725 / (1.0 + 0.741 * ((1.0 - x) / x) ** 0.3321) * film**0.25 + (1.0 - x**0.087) * h_lo
    value: float = (h_a * (j_t / j) ** 0.8 - h_s) * (j / j_t) + h_s
    return value


def _two_phase_gradient(x: float, g: float, d: float, liquid: IAPWS97, vapour: IAPWS97) -> float:
    def alone(phase: IAPWS97) -> float:
        re = g * d / phase.mu
        f = 64.0 / re if re < 1187.0 else 0.3164 / re**0.25
        value: float = f * g * g / (2.0 * phase.rho * d)
        return value

    a, b = alone(liquid), alone(vapour)
    value: float = (a + 2.0 * (b - a) * x) * (1.0 - x) ** (1.0 / 3.0) + b * x**3
    return value


def steam_heater(bank: Tubes, gas: Fluid, m: float, t_in: float, p_in: float, p_steam: float) -> March:
    """Saturated steam in every row, as much as condenses there; the steam's own drop is not fed back."""
    liquid, vapour = IAPWS97(P=p_steam / 1e6, x=0), IAPWS97(P=p_steam / 1e6, x=1)
    saturation, latent = liquid.T, (vapour.h - liquid.h) * 1e3
    pieces = 40
    qualities = [1.0 - (i + 0.5) / pieces for i in range(pieces)]
    ratio = bank.d / bank.bore
    t, p = t_in, p_in
    found = March([], 0.0, 0.0)
    for row in range(1, bank.rows + 1):
        heat = found.heat[-1] if found.heat else 1000.0 * bank.across
        for _ in range(40):
            flow = heat / latent
            g = flow / (bank.across * 0.25 * pi * bank.bore**2)
            flux = heat / (bank.row_area / ratio)
            films = []
            for x in qualities:
                film = 10000.0
                for _ in range(30):
                    film = _cavallini(x, g, bank.bore, flux / film, liquid, vapour)
                films.append(film)
            inside = 1.0 / (sum(1.0 / f for f in films) / pieces)
            resistance = bank.wall_resistance + ratio / inside

            def through(h: float, r: float = resistance) -> tuple[float, float]:
                return saturation, 1.0 / (1.0 / h + r)

            t_out, new, p_out = _gas_row(bank, gas, row, m, t, p, through)
            done = abs(new - heat) < 1e-7 * new
            heat = new
            if done:
                break
        g = heat / latent / (bank.across * 0.25 * pi * bank.bore**2)
        lost = 0.5 * g * g / (2.0 * vapour.rho) - g * g * (1.0 / vapour.rho - 1.0 / liquid.rho)
        lost += (
            bank.length
            * sum(_two_phase_gradient(x, g, bank.bore, liquid, vapour) for x in qualities)
            / pieces
        )
        found.inside_drop = max(found.inside_drop, lost) if found.heat else lost
        found.heat.append(heat)
        found.flow += heat / latent
        t, p = t_out, p_out
    found.outlet, found.drop = t, p_in - p
    return found


# --- liquid inside ----------------------------------------------------------------------------------------


def _gnielinski_inside(re: float, here: Props, wall: Props, slenderness: float) -> float:
    """Turbulent liquid, Re above 4000."""
    assert re > 4000.0
    f = (1.8 * log(re) / log(10.0) - 1.5) ** -2 / 8.0
    nu = f * (re - 1000.0) * here.pr / (1.0 + 12.7 * sqrt(f) * (here.pr ** (2.0 / 3.0) - 1.0))
    value: float = nu * (1.0 + slenderness ** (2.0 / 3.0)) * (here.pr / wall.pr) ** 0.11
    return value


def _churchill(re: float, rough: float, viscosity_ratio: float) -> float:
    a = (2.457 * log(1.0 / ((7.0 / re) ** 0.9 + 0.27 * rough))) ** 16
    f = 8.0 * ((8.0 / re) ** 12 + (a + (37530.0 / re) ** 16) ** -1.5) ** (1.0 / 12.0)
    # heated liquid (7 - mu/mu_w)/6
    value: float = f * (
        (7.0 - 1.0 / viscosity_ratio) / 6.0 if viscosity_ratio < 1.0 else viscosity_ratio**0.24
    )
    return value


def counter_cross(
    bank: Tubes, gas: Fluid, m: float, t_in: float, p_in: float, flow: float, t_water: float, p_water: float
) -> March:
    """Water heated in as many passes as there are rows, entering at the last row; 24 pieces along a tube."""
    n, pieces = bank.rows, 24
    entering = [t_water] * n  # by row, at the end where its pass begins
    leaving = [t_water + 5.0] * n
    gas_means = [t_in] * n
    walls = [0.5 * (t_in + t_water)] * n
    heat = [0.0] * n
    field = [[t_in] * pieces for _ in range(n + 1)]
    g_in = flow / (bank.across * 0.25 * pi * bank.bore**2)
    g_max, ratio = m / bank.free, bank.d / bank.bore
    friction = [0.0] * n
    inner = list(walls)
    for _ in range(80):
        change = 0.0
        for row in range(n):
            entering[row] = leaving[row + 1] if row + 1 < n else t_water
        for row in range(n):
            here = gas(gas_means[row], p_in)
            h = across_coefficient(bank, row + 1, g_max, here, gas_means[row] / walls[row])
            mean = 0.5 * (entering[row] + leaving[row])
            liquid, at_wall = water(mean, p_water), water(inner[row], p_water)
            re = g_in * bank.bore / liquid.mu
            inside = _gnielinski_inside(re, liquid, at_wall, bank.bore / bank.length) * liquid.k / bank.bore
            u = 1.0 / (1.0 / h + bank.wall_resistance + ratio / inside)
            c_gas, c_water = m * here.cp / pieces, flow * liquid.cp
            half = 0.5 * u * bank.row_area / pieces
            order = range(pieces) if (n - 1 - row) % 2 == 0 else range(pieces - 1, -1, -1)
            t, q_row = entering[row], 0.0
            for s in order:
                above = field[row][s]
                # arithmetic means of both streams over the piece
                q = 2.0 * half * (above - t) / (1.0 + half / c_gas + half / c_water)
                field[row + 1][s] = above - q / c_gas
                t += q / c_water
                q_row += q
            change = max(change, abs(t - leaving[row]))
            leaving[row], heat[row] = t, -q_row
            gas_means[row] = 0.5 * sum(field[row] + field[row + 1]) / pieces
            flux = q_row / bank.row_area
            walls[row] = gas_means[row] - flux / h
            inner[row] = mean + flux * ratio / inside
            friction[row] = _churchill(re, bank.roughness / bank.bore, at_wall.mu / liquid.mu) * (
                bank.length / bank.bore * g_in**2 / (2.0 * liquid.rho)
            )
        if change < 1e-9:
            break
    p = p_in
    for row in range(n):
        here = gas(gas_means[row], p)
        first, last = (sum(line) / pieces for line in field[row : row + 2])
        p_before = p
        p -= across_loss(bank, g_max, here, gas(walls[row], p).mu) * g_max**2 / (2.0 * here.rho)
        p -= (m / bank.face) ** 2 * (1.0 / gas(last, p).rho - 1.0 / gas(first, p_before).rho)
    inside_drop = sum(
        f + 1.5 * g_in**2 / (2.0 * water(t, p_water).rho) for f, t in zip(friction, entering, strict=True)
    )
    inside_drop += g_in**2 * (1.0 / water(leaving[0], p_water).rho - 1.0 / water(t_water, p_water).rho)
    return March(heat, sum(field[n]) / pieces, p_in - p, leaving[0], inside_drop, flow)
