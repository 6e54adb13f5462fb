"""A second derivation of the checks of columns, from the clauses, sharing nothing with calcpack.

A column is a dictionary of plain numbers in in and psi, keyed as in columns.csv, with `bars` (count), `size`, `n_x`,
`n_y`, `tie`, `spacing`, `spiral` in place of the texts. Forces are vectors (P, Mx bottom, Mx top, My bottom, My top, Vx, Vy)
in lb and lb*in, compression positive, equal signs at both ends bending in single curvature. Clauses are those of
ACI 318-14 and 318-19 where no edition is named, and of ASCE 7-16 and 7-22 for the combinations: common practice.
"""

from __future__ import annotations

import itertools
import math
from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from typing import Any

import numpy as np
import shapely
from scipy.optimize import brentq, root
from second_derivation import SIZES, Row

Vector = np.ndarray[Any, np.dtype[np.float64]]
Point = tuple[float, float, float]

E_S = 29e6
EPS_CU = 0.003  # 22.2.2.1
AT_THE_EDGE = 1e-7  # in: how far a bar's centre moves while the block takes hold of it


# The section


@dataclass(frozen=True)
class Section:
    """What bends: the outline, the bars and what they are made of."""

    column: Row
    edition: str
    bars: Vector = field(init=False)
    outline: Any = field(init=False)

    def __post_init__(self) -> None:
        object.__setattr__(self, "bars", bar_centres(self.column))
        b, h = self.column["b"], self.column["h"]
        outline = None if b is None else shapely.box(-b / 2, -h / 2, b / 2, h / 2)
        object.__setattr__(self, "outline", outline)

    @property
    def beta_1(self) -> float:
        """22.2.2.4.3."""
        return float(min(0.85, max(0.65, 0.85 - 0.05 * (self.column["f_c"] - 4000) / 1000)))

    @property
    def area_of_bar(self) -> float:
        return SIZES[self.column["size"]][1]

    def reach(self, theta: float) -> float:
        """From the centroid to the extreme fibre in compression."""
        b, h = self.column["b"], self.column["h"]
        return float(h / 2 if b is None else (abs(math.cos(theta)) * b + abs(math.sin(theta)) * h) / 2)

    def block(self, theta: float, a: float) -> tuple[float, float, float]:
        """Area of the block of depth `a` and its first moments about the x and the y axis."""
        reach = self.reach(theta)
        cos, sin = math.cos(theta), math.sin(theta)
        if a >= 2 * reach:
            return gross_area(self.column), 0.0, 0.0
        if self.outline is None:
            half = math.acos((reach - a) / reach)
            area = reach**2 * (half - math.sin(half) * math.cos(half))
            first = 2 / 3 * (reach * math.sin(half)) ** 3
            return area, first * sin, first * cos
        far, inner = 4 * reach, reach - a
        corners = [(inner, -far), (far, -far), (far, far), (inner, far)]
        half_plane = shapely.Polygon([(u * cos - v * sin, u * sin + v * cos) for u, v in corners])
        cut = shapely.intersection(self.outline, half_plane)
        centre = shapely.centroid(cut)
        area = shapely.area(cut)
        return area, area * shapely.get_y(centre), area * shapely.get_x(centre)

    def depths(self, theta: float) -> Vector:
        """Of the bars' centres, from the extreme fibre in compression."""
        return np.asarray(self.reach(theta) - self.bars @ np.array([math.cos(theta), math.sin(theta)]))

    def held(self, theta: float, c: float) -> Vector:
        """The share of each bar inside the block: all or nothing, but for the bar at its very edge."""
        return np.asarray(np.clip((self.beta_1 * c - self.depths(theta)) / AT_THE_EDGE + 0.5, 0, 1))

    def nominal(self, theta: float, c: float, inside: Vector | None = None) -> tuple[float, float, float, float]:
        """P_n, M_nx, M_ny with compression towards the angle `theta` and the neutral axis at `c`; phi (21.2.2).

        `inside` says which bars displace concrete where that is not left to where they lie.
        """
        f_c, f_y = self.column["f_c"], self.column["f_y"]
        a = min(self.beta_1 * c, 2 * self.reach(theta))
        depth = self.depths(theta)
        stress = np.clip(E_S * EPS_CU * (1 - depth / c), -f_y, f_y)
        force = self.area_of_bar * (stress - 0.85 * f_c * (self.held(theta, c) if inside is None else inside))
        area, first_x, first_y = self.block(theta, a)
        P = 0.85 * f_c * area + force.sum()
        M_x = 0.85 * f_c * first_x + force @ self.bars[:, 1]
        M_y = 0.85 * f_c * first_y + force @ self.bars[:, 0]
        return float(P), float(M_x), float(M_y), self.phi(EPS_CU * (float(depth.max()) / c - 1))

    def phi(self, eps_t: float) -> float:
        """Table 21.2.2."""
        least = 0.75 if self.column["spiral"] else 0.65
        f_y = self.column["f_y"]
        eps_ty = 0.002 if (self.edition, f_y) == ("14", 60000) else f_y / E_S
        upper = 0.005 if self.edition == "14" else eps_ty + 0.003
        return least + (0.9 - least) * min(max((eps_t - eps_ty) / (upper - eps_ty), 0), 1)


def bar_centres(column: Row) -> Vector:
    """Rows of (x, y): evenly spaced along the faces, or on a circle from the +x axis."""
    inset = column["cover"] + SIZES[column["tie"]][0] + SIZES[column["size"]][0] / 2
    if column["b"] is None:
        turn = 2 * np.pi * np.arange(column["bars"]) / column["bars"]
        return (column["h"] / 2 - inset) * np.column_stack([np.cos(turn), np.sin(turn)])
    right, top = column["b"] / 2 - inset, column["h"] / 2 - inset
    along_x, along_y = np.linspace(-right, right, column["n_x"]), np.linspace(-top, top, column["n_y"])
    held = {(x, y) for x in along_x for y in (-top, top)} | {(x, y) for x in (-right, right) for y in along_y}
    return np.array(sorted(held))


def gross_area(column: Row) -> float:
    b, h = column["b"], column["h"]
    return float(math.pi / 4 * h**2 if b is None else b * h)


def steel_area(column: Row) -> float:
    return float(column["bars"] * SIZES[column["size"]][1])


def axial(column: Row) -> tuple[float, float]:
    """P_o and phi P_n,max; 22.4.2, f_y taken to 80,000 psi."""
    steel = steel_area(column)
    P_o = 0.85 * column["f_c"] * (gross_area(column) - steel) + min(column["f_y"], 80000) * steel
    return P_o, (0.75 * 0.85 if column["spiral"] else 0.65 * 0.80) * P_o


def _turned(angle: float) -> float:
    return (angle + math.pi) % (2 * math.pi) - math.pi


Level = Callable[[float, float, float], float]
Crossing = tuple[float, float, float, float]


def _one(section: Section, bearing: float, level: Level) -> tuple[float, float]:
    """An angle and a neutral axis where `level` vanishes and the moment has its bearing."""
    scale = 2 * section.reach(bearing)
    misses = _misses(section, bearing, level, None)
    for start in (0.0, -0.7, 0.7):
        tried = root(misses, [bearing, start], tol=1e-11)
        if tried.success and max(map(abs, misses(tried.x))) < 1e-8:
            return float(tried.x[0]), scale * math.exp(float(tried.x[1]))

    def depth_at(theta: float) -> float:
        return float(brentq(lambda z: misses(np.array([theta, z]))[1], -9, 9, xtol=1e-12))

    def miss(theta: float) -> float:
        return misses(np.array([theta, depth_at(theta)]))[0]

    theta = float(brentq(miss, bearing - 1.5, bearing + 1.5, xtol=1e-12))
    return theta, scale * math.exp(depth_at(theta))


def _misses(section: Section, bearing: float, level: Level, inside: Vector | None) -> Callable[[Vector], list[float]]:
    """What is left of the two conditions, over the angle and the logarithm of the neutral axis."""
    scale = 2 * section.reach(bearing)

    def misses(unknown: Vector) -> list[float]:
        c = scale * math.exp(min(max(float(unknown[1]), -9), 9))
        P, M_x, M_y, phi = section.nominal(float(unknown[0]), c, inside)
        return [_turned(math.atan2(M_x, M_y) - bearing), level(P, math.hypot(M_x, M_y), phi)]

    return misses


def crossings(section: Section, bearing: float, level: Level) -> list[Crossing]:
    """Every point of the surface there: a bar that enters the block takes the strength back a little, and may make two.

    Where a bar's entering leaves no point, the one with the bar partly inside closes the surface.
    """
    theta, c = _one(section, bearing, level)
    scale = 2 * section.reach(bearing)
    gap = section.depths(theta) - section.beta_1 * c
    near = [int(bar) for bar in np.argsort(abs(gap))[:4] if abs(gap[bar]) < 1]
    found = []
    for chosen in itertools.product((0.0, 1.0), repeat=len(near)):
        inside = np.where(gap < 0, 1.0, 0.0)
        inside[near] = chosen
        misses = _misses(section, bearing, level, inside)
        tried = root(misses, [theta, math.log(c / scale)], tol=1e-11)
        at, depth = float(tried.x[0]), scale * math.exp(float(tried.x[1]))
        lies = section.depths(at) < section.beta_1 * depth
        if max(map(abs, misses(tried.x))) < 1e-8 and (lies == (inside > 0.5)).all():
            found.append(section.nominal(at, depth, inside))
    return found or [section.nominal(theta, c)]


def ray_ratio(section: Section, point: Point) -> float:
    """Demand over design strength along the ray from the origin; the lesser strength where it meets two."""
    P, M_x, M_y = point
    M = math.hypot(M_x, M_y)
    P_o, phi_P_n_max = axial(section.column)
    by_cap = max(P, 0.0) / phi_P_n_max
    if M <= 1e-9 * abs(P) * section.column["h"]:
        return by_cap if P >= 0 else -P / (0.9 * section.column["f_y"] * steel_area(section.column))
    unit = P_o * section.column["h"]
    slope = math.atan2(P / P_o, M / unit)
    met = crossings(section, math.atan2(M_x, M_y), lambda N, m, phi: math.atan2(N / P_o, m / unit) - slope)
    strength = min(phi * math.hypot(N / P_o, math.hypot(m_x, m_y) / unit) for N, m_x, m_y, phi in met)
    return max(math.hypot(P / P_o, M / unit) / strength, by_cap)


def moment_ratio(section: Section, point: Point) -> float | None:
    """Demand over design strength at constant P; None where P alone is too much."""
    P, M_x, M_y = point
    P_o, phi_P_n_max = axial(section.column)
    if P > phi_P_n_max or -P > 0.9 * section.column["f_y"] * steel_area(section.column):
        return None
    met = crossings(section, math.atan2(M_x, M_y), lambda N, m, phi: (phi * N - P) / P_o)
    return math.hypot(M_x, M_y) / min(phi * math.hypot(m_x, m_y) for _, m_x, m_y, phi in met)


# Strength combinations

ROOF = {"16": {"Lr": (0.5, 1.6), "S": (0.5, 1.6), "R": (0.5, 1.6)}, "22": {"Lr": (0.5, 1.6), "S": (0.3, 1.0), "R": (0.5, 1.6)}}
SNOW_WITH_E = {"16": 0.2, "22": 0.15}


@dataclass(frozen=True)
class Factored:
    """Forces of one combination, the part of wind or earthquake in them, and the dead load's axial force."""

    total: Vector
    lateral: Vector
    sustained: float | None = None


def combined(loads: Mapping[str, Sequence[Vector]], standard: str, settings: Mapping[str, float]) -> Iterator[Factored]:
    """2.3.1 and 2.3.6: every sign, every alternative of a load, every variable load in and out."""
    nothing = [np.zeros(7)]
    D = sum(loads.get("D", []), np.zeros(7))
    F = sum(loads.get("F", []), np.zeros(7))
    T, H = (nothing + list(loads.get(load, [])) for load in "TH")
    L = nothing + [row for row in loads.get("L", [])]
    W = [sign * row for row in loads.get("W", []) for sign in (1, -1)]
    E = [sign * settings["rho"] * row for row in loads.get("E", []) for sign in (1, -1)]
    E_v = 0.2 * settings["S_DS"] * D
    f = settings["live_companion"]
    roof = {
        which: nothing + [share[which] * row for load, share in ROOF[standard].items() for row in loads.get(load, [])]
        for which in (0, 1)
    }
    snow = nothing + [SNOW_WITH_E[standard] * row for row in loads.get("S", [])]
    no_wind = nothing
    # factor of D, factor of F, D's forces, then lists of what may act beside it, the last one lateral
    basic = [
        (1.4, 1.4, 1.4 * D, [nothing], no_wind),
        (1.2, 1.2, 1.2 * D, [[1.6 * row for row in L], roof[0]], no_wind),
        (1.2, 1.2, 1.2 * D, [roof[1], [f * row for row in L]], no_wind),
        (1.2, 1.2, 1.2 * D, [roof[1]], [0.5 * row for row in W]),
        (1.2, 1.2, 1.2 * D, [[f * row for row in L], roof[0]], W),
        (0.9, 0.0, 0.9 * D, [nothing], W),
        (1.2, 1.2, 1.2 * D + E_v, [[f * row for row in L], snow], E),
        (0.9, 0.9, 0.9 * D - E_v, [nothing], E),
    ]
    for dead, fluid, permanent, beside, lateral in basic:
        sides = [T, [share * row for share in (1.6, 0.9) for row in H]]
        for parts in itertools.product(*beside, lateral, *sides):
            total = permanent + fluid * F + sum(parts)
            yield Factored(total, parts[len(beside)], dead * D[0] + fluid * F[0])


# Slenderness


@dataclass(frozen=True)
class Slender:
    """One axis of one combination: what was found on the way to the magnified moment."""

    values: Mapping[str, float]
    slender: bool
    stable: bool
    M_2: float
    M_c: float  # from the end moments
    M_c_min: float  # from the minimum moment, or from the end moments where they are larger


def k_nonsway(psi_A: float, psi_B: float) -> float:
    """The chart's equation for frames held against sway (R6.2.5.1), in u = pi/k."""

    def miss(u: float) -> float:
        return psi_A * psi_B / 4 * u**2 + (psi_A + psi_B) / 2 * (1 - u / math.tan(u)) + 2 * math.tan(u / 2) / u - 1

    if psi_A == psi_B == 0:
        return 0.5
    return math.pi / float(brentq(miss, math.pi + 1e-9, 2 * math.pi - 1e-9, xtol=1e-13))


def k_sway(psi_A: float, psi_B: float) -> float:
    """The chart's equation for frames free to sway (R6.2.5.1), in u = pi/k."""

    def miss(u: float) -> float:
        return (psi_A * psi_B * u**2 - 36) / (6 * (psi_A + psi_B)) - u / math.tan(u)

    if psi_A == psi_B == 0:
        return 1.0
    return math.pi / float(brentq(miss, 1e-9, math.pi - 1e-9, xtol=1e-13))


def _k(column: Row, axis: str) -> tuple[float, float]:
    """k for P_c, where the ends are held by what magnifies sway apart, and k for the limit of slenderness."""
    psi = column.get(f"psi_{axis}_bottom"), column.get(f"psi_{axis}_top")
    held = 1.0 if psi[0] is None else k_nonsway(*psi)
    if column["frame"] == "sway":
        return held, column.get(f"k_{axis}") or max(k_sway(*psi), 1.0)
    return (column.get(f"k_{axis}") or held,) * 2


def stiffness(column: Row, axis: str, beta_dns: float, formula: str) -> float:
    """(EI)_eff, 6.6.4.4.4 (a) or (b)."""
    b, h = column["b"], column["h"]
    wide, deep = (b, h) if axis == "x" else (h, b)
    I_g = math.pi * h**4 / 64 if b is None else wide * deep**3 / 12
    E_c = 57000 * math.sqrt(column["f_c"])
    if formula == "a":
        return float(0.4 * E_c * I_g / (1 + beta_dns))
    levels = bar_centres(column)[:, 1 if axis == "x" else 0]
    I_se = SIZES[column["size"]][1] * float((levels**2).sum())
    return float((0.2 * E_c * I_g + E_S * I_se) / (1 + beta_dns))


def _gyration(column: Row, axis: str) -> tuple[float, float]:
    """The side in the direction of bending, and r; 6.2.5.1."""
    if column["b"] is None:
        return column["h"], 0.25 * column["h"]
    deep = column["h"] if axis == "x" else column["b"]
    return deep, 0.30 * deep


def beyond_22(column: Row, axis: str) -> bool:
    """6.2.5.1(a); a magnifier that is stated is meant to be used."""
    return bool(column.get("delta_s")) or _k(column, axis)[1] * column["l_u"] / _gyration(column, axis)[1] > 22


def one_axis(column: Row, axis: str, P: float, ends: Sequence[float], first: Sequence[float], EI: float) -> Slender:
    """6.2.5 and 6.6.4.5: `ends` with the sway magnified, `first` without."""
    deep, r = _gyration(column, axis)
    k, k_limit = _k(column, axis)
    small, large = sorted(ends, key=abs)
    quotient = -small / large if large else -1.0  # single curvature negative
    limit = 22.0 if column["frame"] == "sway" else min(34 + 12 * quotient, 40.0)
    over = beyond_22(column, axis) if column["frame"] == "sway" else k_limit * column["l_u"] / r > limit
    slender = P > 0 and over
    P_c = math.pi**2 * EI / (k * column["l_u"]) ** 2
    M_2_min = P * (0.6 + 0.03 * deep)
    C_m = 0.6 - 0.4 * quotient
    stable = not slender or P < 0.75 * P_c
    delta = max(C_m / (1 - P / (0.75 * P_c)), 1.0) if slender and stable else 1.0
    values = {
        "k": k, "r": r, "slenderness": k_limit * column["l_u"] / r, "slenderness_max": limit, "P_c": P_c, "C_m": C_m,
        "delta_ns": delta, "M_2_min": M_2_min, "stability": P / (0.75 * P_c),
        "second-order": delta * max(abs(large), M_2_min) / (1.4 * max(max(map(abs, first)), M_2_min, 1e-9)),
    }  # fmt: skip
    if not slender:
        return Slender(values, slender, stable, large, large, large)
    sign = math.copysign(1.0, large)
    return Slender(values, slender, stable, large, delta * large, sign * delta * max(abs(large), M_2_min))


def sway_magnifier(column: Row, stories: Mapping[tuple[str, str], Row], combination: str) -> float:
    """6.6.4.6.2: as stated, (a) up to 1.5, (b) beyond."""
    if column["frame"] != "sway":
        return 1.0
    if column.get("delta_s"):
        return float(column["delta_s"])
    story = stories.get((column["story"], combination)) or stories[column["story"], ""]
    Q = story["sum_P_u"] * story["Delta_o"] / (story["V_us"] * story["l_c"])
    by_Q = 1 / (1 - Q) if Q < 1 else math.inf
    return float(by_Q if by_Q <= 1.5 else 1 / (1 - story["sum_P_u"] / (0.75 * story["sum_P_c"])))


def demands(column: Row, forces: Factored, delta_s: float, formula: str) -> tuple[list[Point], dict[str, Slender]]:
    """The points to be held against the surface, and each axis on the way."""
    P = float(forces.total[0])
    if column.get("l_u") is None:
        return [(P, float(forces.total[end]), float(forces.total[end + 2])) for end in (1, 2)], {}
    swayed = [delta_s - 1 if column["frame"] == "sway" and beyond_22(column, axis) else 0.0 for axis in "xxyy"]
    magnified = forces.total + np.array([0.0, *swayed, 0.0, 0.0]) * forces.lateral
    beta = column.get("beta_dns")
    if beta is None and forces.sustained is not None and P > 0:
        beta = min(max(forces.sustained / P, 0.0), 1.0)  # 6.6.4.4.4
    beta = 0.6 if beta is None else beta  # R6.6.4.4.4
    axes = {}
    for axis, at in (("x", slice(1, 3)), ("y", slice(3, 5))):
        EI = stiffness(column, axis, beta, formula)
        axes[axis] = one_axis(column, axis, P, magnified[at], forces.total[at], EI)
    if not any(one.slender for one in axes.values()):
        return [(P, float(magnified[end]), float(magnified[end + 2])) for end in (1, 2)], axes
    x, y = axes["x"], axes["y"]
    return [(P, x.M_c_min, y.M_c), (P, x.M_c, y.M_c_min)], axes


# Shear


@dataclass(frozen=True)
class Shear:
    """One direction of one combination, in lb and in."""

    V_u: float
    V_c: float
    V_s: float
    V_u_max: float
    A_v: float
    A_v_min: float
    s_max: float
    required: bool

    @property
    def phi_V_n(self) -> float:
        return 0.75 * (self.V_c + self.V_s)


def shear(column: Row, edition: str, P: float, V_u: float, axis: str) -> Shear:
    """22.5 with axial force, 10.6.2, Table 10.7.6.5.2, in the direction of `axis` (round: of the resultant)."""
    f_c, h = column["f_c"], column["h"]
    bars, area = bar_centres(column), SIZES[column["size"]][1]
    if column["b"] is None:
        b_w, deep, legs = h, h, 2  # 22.5.10.5.6
        depths = h / 2 + bars[:, 0]
    else:
        b_w, deep = (column["b"], h) if axis == "y" else (h, column["b"])
        depths = deep / 2 + bars[:, 1 if axis == "y" else 0]
        legs = column[f"legs_{axis}"]
    far = depths[depths > 2 / 3 * deep]  # R22.5.5.1
    d = 0.8 * h if column["b"] is None else float(far.mean())  # 22.5.2.2
    count = len(far)
    if column["b"] is None:  # the fewest in any direction
        count = math.floor(2 * math.acos(h / 6 / float(np.hypot(*bars[0]))) / (2 * math.pi / len(bars)))
    A_v = legs * SIZES[column["tie"]][1]
    f_yt = min(column["f_yt"], 60000)  # 20.2.2.4
    A_v_min = max(0.75 * math.sqrt(f_c), 50) * b_w * column["spacing"] / f_yt
    rho_w = area * count / (b_w * d)
    size = 1.0 if A_v >= A_v_min else min(math.sqrt(2 / (1 + d / 10)), 1.0)
    rooted = column.get("lambda", 1.0) * min(math.sqrt(f_c), 100.0)
    A_g = gross_area(column)
    if edition == "14":
        per_area = 2 * (1 + P / ((2000 if P >= 0 else 500) * A_g)) * rooted  # 22.5.6.1, 22.5.7.1
    else:
        by_force = min(P / (6 * A_g), 0.05 * f_c)
        base = 2.0 if A_v >= A_v_min else 8 * size * rho_w ** (1 / 3)
        per_area = min(base * rooted + by_force, 5 * rooted)
    V_c = max(per_area, 0.0) * b_w * d
    V_s = A_v * f_yt * d / column["spacing"]
    needed = max(V_u / 0.75 - V_c, 0.0)
    loose = needed <= 4 * math.sqrt(f_c) * b_w * d
    s_max = min(d / 2, 24) if loose else min(d / 4, 12)
    V_u_max = 0.75 * (V_c + 8 * math.sqrt(f_c) * b_w * d)
    return Shear(V_u, V_c, V_s, V_u_max, A_v, A_v_min, s_max, V_u > 0.5 * 0.75 * V_c)


# Detailing


def detailing(column: Row) -> dict[str, float]:
    """Ratios of what is set over what is allowed, by the names of the checks."""
    d_b, d_bt, s = SIZES[column["size"]][0], SIZES[column["tie"]][0], column["spacing"]
    stone = 4 / 3 * column["aggregate"]
    rho = steel_area(column) / gross_area(column)
    found = {
        "reinforcement ratio": max(0.01 / rho, rho / 0.08),  # 10.6.1.1
        "number of bars": (6 if column["spiral"] else 4) / column["bars"],  # 10.7.3.1
        "bar spacing": max(1.5, 1.5 * d_b, stone) / (min(_pitches(column)) - d_b),  # 25.2.3
    }
    if column["spiral"]:
        core = column["h"] - 2 * column["cover"]
        rho_s = math.pi * (core - d_bt) * SIZES[column["tie"]][1] / (s * math.pi / 4 * core**2)
        least = 0.45 * ((column["h"] / core) ** 2 - 1) * column["f_c"] / min(column["f_yt"], 100000)
        found["spiral size"] = 0.375 / d_bt  # 25.7.3.2
        found["spiral pitch"] = max((s - d_bt) / 3, max(1.0, stone) / (s - d_bt))  # 25.7.3.1
        found["spiral ratio"] = least / rho_s  # 25.7.3.3
    else:
        side = column["h"] if column["b"] is None else min(column["b"], column["h"])
        found["tie size"] = (0.375 if column["size"] <= 10 else 0.5) / d_bt  # 25.7.2.2
        found["tie spacing"] = max(s / min(16 * d_b, 48 * d_bt, side), stone / (s - d_bt))  # 25.7.2.1
    return found


def _pitches(column: Row) -> list[float]:
    """Centre to centre of neighbouring bars, along each kind of face or round the circle."""
    if column["b"] is None:
        first, second = bar_centres(column)[:2]
        return [float(np.hypot(*(second - first)))]
    inset = column["cover"] + SIZES[column["tie"]][0] + SIZES[column["size"]][0] / 2
    return [(column["b"] - 2 * inset) / (column["n_x"] - 1), (column["h"] - 2 * inset) / (column["n_y"] - 1)]


def held_spacing(column: Row) -> float:
    """h_x: bars in corners of hoops and hooks of crossties, crossties spread as evenly as the bars allow."""
    pitches = _pitches(column)
    if column["b"] is None:
        return pitches[0]
    faces = ((column["n_x"], column["legs_y"]), (column["n_y"], column["legs_x"]))
    return max(pitch * math.ceil((n - 1) / (min(legs, n) - 1)) for pitch, (n, legs) in zip(pitches, faces, strict=True))


def lateral_support(column: Row) -> bool:
    """25.7.2.3: corners and every other bar held, and no bar further than 6 in clear from one that is."""
    clear = [pitch - SIZES[column["size"]][0] for pitch in _pitches(column)]
    faces = ((column["n_x"], column["legs_y"]), (column["n_y"], column["legs_x"]))
    return all(
        min(legs, n) == n or (gap <= 6 and 2 * legs >= n + 1) for gap, (n, legs) in zip(clear, faces, strict=True)
    )


def special(column: Row, edition: str, P_max: float) -> dict[str, float]:
    """18.7.2 to 18.7.5: the ratios, and l_o in in."""
    h, f_c, f_y = column["h"], column["f_c"], column["f_y"]
    least_side = h if column["b"] is None else min(column["b"], h)
    rho = steel_area(column) / gross_area(column)
    d_b, (d_bt, A_bt), s = SIZES[column["size"]][0], SIZES[column["tie"]], column["spacing"]
    f_yt = min(column["f_yt"], 100000)
    heavy = P_max > 0.3 * gross_area(column) * f_c or f_c > 10000
    times = 5 if edition == "19" and f_y > 60000 else 6
    h_x = held_spacing(column)
    heavy_hoops = heavy and column["b"] is not None
    s_o = min(max(4 + (14 - h_x) / 3, 4.0), 6.0)
    every = 0.0 if not heavy_hoops else max(column["n_x"] / column["legs_y"], column["n_y"] / column["legs_x"])
    found = {
        "l_o": max(h if column["b"] is None else max(column["b"], h), (column.get("l_u") or 0) / 6, 18.0),
        "dimensions": 12 / least_side if column["b"] is None else max(12 / least_side, 0.4 * max(column["b"], h) / least_side),
        "reinforcement ratio": max(0.01 / rho, rho / 0.06),
        "spacing of held bars": max(h_x / (8 if heavy_hoops else 14), every),  # 18.7.5.2(e), (f)
        "spacing within l_o": s / min(least_side / 4, times * d_b, s_o),
        "spacing outside l_o": column.get("beyond", s) / min(times * d_b, 6.0),
    }
    k_f = max(f_c / 25000 + 0.6, 1.0)
    core = h - 2 * column["cover"]
    if column["b"] is None:
        A_ch = math.pi / 4 * core**2
        needed = max(0.45 * (gross_area(column) / A_ch - 1) * f_c, 0.12 * f_c, 0.35 * k_f * P_max / A_ch if heavy else 0)
        found["confinement"] = needed / f_yt / (A_bt * math.pi * (core - d_bt) / (s * A_ch))
        return found
    b_x, b_y = column["b"] - 2 * column["cover"], core
    n_l = 2 * (min(column["legs_y"], column["n_x"]) + min(column["legs_x"], column["n_y"])) - 4
    A_ch = b_x * b_y
    k_n = n_l / (n_l - 2)
    needed = max(
        0.3 * (gross_area(column) / A_ch - 1) * f_c, 0.09 * f_c, 0.2 * k_f * k_n * P_max / A_ch if heavy else 0
    ) / f_yt
    found["confinement, x"] = needed / (column["legs_x"] * A_bt / (s * b_y))
    found["confinement, y"] = needed / (column["legs_y"] * A_bt / (s * b_x))
    return found
