"""A second derivation of the checks of columns, from the clauses, sharing nothing with calcpack.

A column is a dictionary of plain numbers in in and psi, keyed as in columns.csv, with `bars` (how many), `size`, `n_x`,
`n_y`, `tie`, `spacing`, `spiral` and `beyond` (spacing outside l_o) in place of the texts; `b` is None where it is
round. Forces are vectors (P, Mx bottom, Mx top, My bottom, My top, Vx, Vy) in lb and lb*in, compression positive; equal
signs at both ends bend in single curvature. Clauses are those of ACI 318, of both editions where none is named, and of
ASCE 7 for the combinations: common practice, cited from memory.
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
Nominal = tuple[float, float, float, float]

E_S = 29e6
EPS_CU = 0.003  # 22.2.2.1
AT_THE_EDGE = 1e-7  # in: how far the block's edge moves while it takes hold of a bar
NOISE = 1e-9
FAR = 25.0  # powers of e between the neutral axes looked at and the depth of the section


# The section


def bar_centres(column: Row) -> Vector:
    """Rows of (x, y): evenly spaced along the faces, or on a circle from the +x axis."""
    inset = column["cover"] + SIZES[column["tie"]][0] + SIZES[column["size"]][0] / 2
    if column["b"] is None:
        turn = 2 * np.pi * np.arange(column["bars"]) / column["bars"]
        return np.asarray((column["h"] / 2 - inset) * np.column_stack([np.cos(turn), np.sin(turn)]))
    right, top = column["b"] / 2 - inset, column["h"] / 2 - inset
    along_x, along_y = np.linspace(-right, right, column["n_x"]), np.linspace(-top, top, column["n_y"])
    centres = {(x, y) for x in along_x for y in (-top, top)} | {(x, y) for x in (-right, right) for y in along_y}
    return np.array(sorted(centres))


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


def pull(column: Row) -> float:
    """phi P_nt,max; 22.4.3."""
    return float(0.9 * column["f_y"] * steel_area(column))


@dataclass(frozen=True)
class Section:
    """What bends: the column, its bars and its outline, None where it is round."""

    column: Row
    edition: str
    bars: Vector = field(init=False)
    outline: Any = field(init=False)

    def __post_init__(self) -> None:
        b, h = self.column["b"], self.column["h"]
        object.__setattr__(self, "bars", bar_centres(self.column))
        object.__setattr__(self, "outline", None if b is None else shapely.box(-b / 2, -h / 2, b / 2, h / 2))

    @property
    def beta_1(self) -> float:
        """22.2.2.4.3."""
        return float(min(0.85, max(0.65, 0.85 - 0.05 * (self.column["f_c"] - 4000) / 1000)))

    def reach(self, theta: float) -> float:
        """From the centroid to the extreme fibre in compression, towards the angle `theta`."""
        b, h = self.column["b"], self.column["h"]
        return float(h / 2 if b is None else (abs(math.cos(theta)) * b + abs(math.sin(theta)) * h) / 2)

    def depths(self, theta: float) -> Vector:
        """Of the bars' centres, from the extreme fibre in compression."""
        return np.asarray(self.reach(theta) - self.bars @ np.array([math.cos(theta), math.sin(theta)]))

    def block(self, theta: float, a: float) -> tuple[float, float, float]:
        """Area of the block of depth `a` and its first moments about the x and the y axis."""
        reach = self.reach(theta)
        cos, sin = math.cos(theta), math.sin(theta)
        if a >= 2 * reach:
            return gross_area(self.column), 0.0, 0.0
        if self.outline is None:
            half = math.acos((reach - a) / reach)
            first = 2 / 3 * (reach * math.sin(half)) ** 3
            return reach**2 * (half - math.sin(half) * math.cos(half)), first * sin, first * cos
        far, inner = 4 * reach, reach - a
        corners = [(inner, -far), (far, -far), (far, far), (inner, far)]
        half_plane = shapely.Polygon([(u * cos - v * sin, u * sin + v * cos) for u, v in corners])
        cut = shapely.intersection(self.outline, half_plane)
        area, centre = float(shapely.area(cut)), shapely.centroid(cut)
        return area, area * shapely.get_y(centre), area * shapely.get_x(centre)

    def nominal(self, theta: float, c: float, inside: Vector | None = None) -> Nominal:
        """P_n, M_nx and M_ny with compression towards `theta` and the neutral axis at `c`, and phi.

        `inside` says which bars displace concrete where that is not left to where their centres lie.
        """
        f_c, f_y = self.column["f_c"], self.column["f_y"]
        a = min(self.beta_1 * c, 2 * self.reach(theta))
        depth = self.depths(theta)
        if inside is None:
            inside = np.clip((self.beta_1 * c - depth) / AT_THE_EDGE + 0.5, 0, 1)
        stress = np.clip(E_S * EPS_CU * (1 - depth / c), -f_y, f_y)
        force = SIZES[self.column["size"]][1] * (stress - 0.85 * f_c * inside)
        area, first_x, first_y = self.block(theta, a)
        P = 0.85 * f_c * area + force.sum()
        M_x = 0.85 * f_c * first_x + force @ self.bars[:, 1]
        M_y = 0.85 * f_c * first_y + force @ self.bars[:, 0]
        return float(P), float(M_x), float(M_y), self.phi(EPS_CU * (float(depth.max()) / c - 1))

    def phi(self, eps_t: float) -> float:
        """Table 21.2.2."""
        least, f_y = 0.75 if self.column["spiral"] else 0.65, self.column["f_y"]
        eps_ty = 0.002 if (self.edition, f_y) == ("14", 60000) else f_y / E_S
        upper = 0.005 if self.edition == "14" else eps_ty + 0.003
        return float(least + (0.9 - least) * min(max((eps_t - eps_ty) / (upper - eps_ty), 0), 1))


# The design surface along a ray, and at constant P

Level = Callable[[float, float, float], float]


def _misses(section: Section, bearing: float, level: Level, inside: Vector | None) -> Callable[[Vector], list[float]]:
    """How far an angle and the logarithm of a neutral axis are from the bearing of the moment and from `level`."""
    scale = 2 * section.reach(bearing)

    def misses(unknown: Vector) -> list[float]:
        c = scale * math.exp(min(max(float(unknown[1]), -FAR), FAR))
        P, M_x, M_y, phi = section.nominal(float(unknown[0]), c, inside)
        turned = math.atan2(M_x, M_y) - bearing
        return [(turned + math.pi) % (2 * math.pi) - math.pi, level(P, math.hypot(M_x, M_y), phi)]

    return misses


def _one(section: Section, bearing: float, level: Level) -> tuple[float, float]:
    """An angle and the logarithm of a neutral axis without a miss: by Newton, or angle by angle between two bounds."""
    misses = _misses(section, bearing, level, None)
    for start in (0.0, -0.7, 0.7):
        tried = root(misses, [bearing, start], tol=1e-11)
        if tried.success and max(map(abs, misses(tried.x))) < 1e-8:
            return float(tried.x[0]), float(tried.x[1])

    def depth_at(theta: float) -> float:
        return float(brentq(lambda depth: misses(np.array([theta, depth]))[1], -FAR, FAR, xtol=1e-12))

    def miss(theta: float) -> float:
        return misses(np.array([theta, depth_at(theta)]))[0]

    theta = float(brentq(miss, bearing - 1.5, bearing + 1.5, xtol=1e-12))
    return theta, depth_at(theta)


def crossings(section: Section, bearing: float, level: Level) -> list[Nominal]:
    """Every point of the surface there: a bar that enters the block takes some strength away, and may make it two.

    Where neither a bar outside nor the same bar inside gives a point, the bar partly inside closes the surface.
    """
    theta, depth = _one(section, bearing, level)
    scale = 2 * section.reach(bearing)
    gap = section.depths(theta) - section.beta_1 * scale * math.exp(depth)
    near = [int(bar) for bar in np.argsort(abs(gap))[:4] if abs(gap[bar]) < 1]
    found = []
    for chosen in itertools.product((0.0, 1.0), repeat=len(near)):
        inside = np.where(gap < 0, 1.0, 0.0)
        inside[near] = chosen
        misses = _misses(section, bearing, level, inside)
        tried = root(misses, [theta, depth], tol=1e-11)
        at, c = float(tried.x[0]), scale * math.exp(float(tried.x[1]))
        lies = section.depths(at) < section.beta_1 * c
        if max(map(abs, misses(tried.x))) < 1e-8 and bool((lies == (inside > 0.5)).all()):
            found.append(section.nominal(at, c, inside))
    return found or [section.nominal(theta, scale * math.exp(depth))]


def ray_ratio(section: Section, point: Point) -> float:
    """Demand over design strength along the ray from the origin; the lesser strength where it meets two."""
    P, M_x, M_y = point
    M = math.hypot(M_x, M_y)
    P_o, phi_P_n_max = axial(section.column)
    by_cap = max(P, 0.0) / phi_P_n_max
    if NOISE * abs(P) * section.column["h"] >= M:
        return by_cap if P >= 0 else -P / pull(section.column)
    unit = P_o * section.column["h"]
    slope = math.atan2(P / P_o, M / unit)
    met = crossings(section, math.atan2(M_x, M_y), lambda N, m, _: math.atan2(N / P_o, m / unit) - slope)
    strength = min(phi * math.hypot(N / P_o, math.hypot(m_x, m_y) / unit) for N, m_x, m_y, phi in met)
    return max(math.hypot(P / P_o, M / unit) / strength, by_cap)


def moment_ratio(section: Section, point: Point) -> float | None:
    """Demand over design strength at constant P; None where P alone is too much."""
    P, M_x, M_y = point
    P_o, phi_P_n_max = axial(section.column)
    if not -pull(section.column) <= P <= phi_P_n_max:
        return None
    met = crossings(section, math.atan2(M_x, M_y), lambda N, _, phi: (phi * N - P) / P_o)
    return math.hypot(M_x, M_y) / min(phi * math.hypot(m_x, m_y) for _, m_x, m_y, phi in met)


# Strength combinations

# As companion and as principal load, ASCE 7-16 and 7-22 2.3.1; with earthquake, 2.3.6.
ROOF = {
    "16": {"Lr": (0.5, 1.6), "S": (0.5, 1.6), "R": (0.5, 1.6)},
    "22": {"Lr": (0.5, 1.6), "S": (0.3, 1.0), "R": (0.5, 1.6)},
}
SNOW_WITH_E = {"16": 0.2, "22": 0.15}

Loads = Mapping[str, Sequence[Vector]]


@dataclass(frozen=True)
class Factored:
    """Forces of one combination, the part of them that sways the frame, and the axial force that is sustained."""

    total: Vector
    lateral: Vector
    sustained: float | None = None


def combined(loads: Loads, standard: str, settings: Mapping[str, float], idle: bool = False) -> Iterator[Factored]:
    """2.3.1 and 2.3.6: every sign, every alternative of a load, companions in and out; with `idle` principals too.

    T counts 1.0 or nothing (2.3.4), H counts 1.6 where it adds and nothing where it resists, F goes with D but for
    0.9 D + W. D, F and H are sustained; E_v is not.
    """
    none = [np.zeros(7)]
    D, F = (sum(loads.get(load, []), np.zeros(7)) for load in "DF")
    T, H = ([*none, *loads.get(load, [])] for load in "TH")
    W = [sign * row for row in loads.get("W", []) for sign in (1, -1)]
    E = [sign * settings["rho"] * row for row in loads.get("E", []) for sign in (1, -1)]
    E_v = 0.2 * settings["S_DS"] * D  # 12.4.2.2
    L = [1.6 * row for row in loads.get("L", [])]
    with_L = [*none, *(settings["live_companion"] * row for row in loads.get("L", []))]
    with_roof, roof = (
        [share[role] * row for load, share in ROOF[standard].items() for row in loads.get(load, [])] for role in (0, 1)
    )
    with_roof = none + with_roof
    snow = [*none, *(SNOW_WITH_E[standard] * row for row in loads.get("S", []))]
    off = none if idle else []
    # Factor of D, factor of F, what D and E_v give, what acts beside them; what sways last.
    basic = [
        (1.4, 1.4, 1.4 * D, [none], none),
        (1.2, 1.2, 1.2 * D, [off + L, with_roof], none),
        (1.2, 1.2, 1.2 * D, [off + roof, with_L], none),
        (1.2, 1.2, 1.2 * D, [off + roof], [0.5 * row for row in W]),
        (1.2, 1.2, 1.2 * D, [with_L, with_roof], W),
        (0.9, 0.0, 0.9 * D, [none], W),
        (1.2, 1.2, 1.2 * D + E_v, [with_L, snow], E),
        (0.9, 0.9, 0.9 * D - E_v, [none], E),
    ]
    for dead, fluid, permanent, beside, swaying in basic:
        for *parts, sway, self_straining, earth in itertools.product(*beside, swaying, T, H):
            total = permanent + fluid * F + sum(parts) + sway + self_straining + 1.6 * earth
            yield Factored(total, sway, float(dead * D[0] + fluid * F[0] + 1.6 * earth[0]))


# Slenderness


@dataclass(frozen=True)
class Axis:
    """One axis of one combination: M_2 as it is, magnified, and magnified from the minimum moment."""

    values: Mapping[str, float]
    slender: bool
    stable: bool
    M_2: float
    M_c: float
    M_c_min: float


def k_nonsway(psi_A: float, psi_B: float) -> float:
    """The equation of the chart for frames held against sway (R6.2.5), in u = pi/k."""

    def miss(u: float) -> float:
        return psi_A * psi_B / 4 * u**2 + (psi_A + psi_B) / 2 * (1 - u / math.tan(u)) + 2 * math.tan(u / 2) / u - 1

    if psi_A == psi_B == 0:
        return 0.5
    return math.pi / float(brentq(miss, math.pi + NOISE, 2 * math.pi - NOISE, xtol=1e-13))


def k_sway(psi_A: float, psi_B: float) -> float:
    """The equation of the chart for frames free to sway (R6.2.5), in u = pi/k."""

    def miss(u: float) -> float:
        return (psi_A * psi_B * u**2 - 36) / (6 * (psi_A + psi_B)) - u / math.tan(u)

    if psi_A == psi_B == 0:
        return 1.0
    return math.pi / float(brentq(miss, NOISE, math.pi - NOISE, xtol=1e-13))


def effective_length(column: Row, axis: str) -> tuple[float, float]:
    """k for P_c, with the ends held by what magnifies the sway apart, and k for the limit of slenderness."""
    psi = [column[f"psi_{axis}_{end}"] for end in ("bottom", "top") if f"psi_{axis}_{end}" in column]
    held = k_nonsway(*psi) if psi else 1.0  # 6.6.4.4.3: 1.0 is permitted
    if column["frame"] == "sway":
        return held, column.get(f"k_{axis}") or k_sway(*psi)
    k = column.get(f"k_{axis}") or held
    return k, k


def gyration(column: Row, axis: str) -> tuple[float, float]:
    """The side in the direction of bending, and r by 6.2.5."""
    if column["b"] is None:
        return column["h"], 0.25 * column["h"]
    deep = column["h"] if axis == "x" else column["b"]
    return deep, 0.30 * deep


def stiffness(column: Row, axis: str, beta_dns: float, formula: str) -> float:
    """(EI)_eff, 6.6.4.4.4 (a) or (b); lightweight concrete at 90 lb/ft^3, the least that 19.2.2.1 covers."""
    b, h = column["b"], column["h"]
    wide, deep = (b, h) if axis == "x" else (h, b)
    I_g = math.pi * h**4 / 64 if b is None else wide * deep**3 / 12
    E_c = (57000 if column["lambda"] == 1 else 33 * 90**1.5) * math.sqrt(column["f_c"])
    if formula == "a":
        return float(0.4 * E_c * I_g / (1 + beta_dns))
    levels = bar_centres(column)[:, 1 if axis == "x" else 0]
    I_se = SIZES[column["size"]][1] * float((levels**2).sum())
    return float((0.2 * E_c * I_g + E_S * I_se) / (1 + beta_dns))


def sways_beyond(column: Row, axis: str) -> bool:
    """6.2.5.1(a); neglect is permitted, and nobody states a magnifier to have it neglected."""
    over = effective_length(column, axis)[1] * column["l_u"] / gyration(column, axis)[1] > 22 + NOISE
    return column["frame"] == "sway" and (over or column.get("delta_s") is not None)


def one_axis(column: Row, axis: str, P: float, ends: Vector, first: Vector, beta_dns: float, formula: str) -> Axis:
    """6.2.5 and 6.6.4.5: `ends` with the sway magnified, `first` without."""
    deep, r = gyration(column, axis)
    k, k_limit = effective_length(column, axis)
    small, large = sorted((float(end) for end in ends), key=abs)
    quotient = -small / large if large else -1.0  # single curvature is negative
    limit = 22.0 if column["frame"] == "sway" else min(34 + 12 * quotient, 40.0)
    over = column["frame"] != "sway" and k_limit * column["l_u"] / r > limit + NOISE
    slender = P > 0 and (over or sways_beyond(column, axis))
    P_c = math.pi**2 * stiffness(column, axis, beta_dns, formula) / (k * column["l_u"]) ** 2
    M_2_min, C_m = P * (0.6 + 0.03 * deep), 0.6 - 0.4 * quotient  # 6.6.4.5.4, 6.6.4.5.3
    used = P / (0.75 * P_c)
    stable = not slender or used < 1
    delta = max(C_m / (1 - used), 1.0) if slender and stable else 1.0
    least = max(abs(large), M_2_min) if slender else abs(large)
    first_order = max(float(abs(first).max()), M_2_min)
    values = {
        "k": k, "r": r, "slenderness_max": limit, "beta_dns": beta_dns, "P_c": P_c, "C_m": C_m, "delta_ns": delta,
        "M_2_min": M_2_min, "M_c": delta * least, "M_c_max": 1.4 * first_order, "stability": used,
        "slenderness": k_limit * column["l_u"] / r / limit,
    }  # fmt: skip
    sign = math.copysign(delta, large)
    return Axis(values, slender, stable, large, delta * large, sign * least)


def sway_magnifier(column: Row, stories: Mapping[tuple[str, str], Row], combination: str) -> float:
    """6.6.4.6.2: as stated, by (a) up to 1.5, by (b) beyond."""
    if column["frame"] != "sway":
        return 1.0
    if column.get("delta_s") is not None:
        return float(column["delta_s"])
    story = stories.get((column["story"], combination)) or stories[column["story"], ""]
    Q = story["sum_P_u"] * story["Delta_o"] / (story["V_us"] * story["l_c"])
    if 1.5 * Q <= 0.5:
        return float(1 / (1 - Q))
    return float(1 / (1 - story["sum_P_u"] / (0.75 * story["sum_P_c"])))


def demands(column: Row, forces: Factored, delta_s: float, formula: str = "a") -> tuple[list[Point], dict[str, Axis]]:
    """The points to be held against the surface, and what was found about each axis on the way.

    The minimum moment is taken about one axis at a time (R6.6.4.5.4).
    """
    P = float(forces.total[0])
    if column["l_u"] is None:
        return [(P, float(forces.total[end]), float(forces.total[end + 2])) for end in (1, 2)], {}
    more = [delta_s - 1 if sways_beyond(column, axis) else 0.0 for axis in "xxyy"]
    magnified = forces.total + np.array([0.0, *more, 0.0, 0.0]) * forces.lateral
    beta_dns = column.get("beta_dns")
    if beta_dns is None and forces.sustained is not None:
        beta_dns = min(max(forces.sustained / P, 0.0), 1.0) if P > 0 else 0.0  # 6.6.4.4.4
    beta_dns = 0.6 if beta_dns is None else beta_dns  # R6.6.4.4.4
    axes = {
        axis: one_axis(column, axis, P, magnified[at], forces.total[at], beta_dns, formula)
        for axis, at in (("x", slice(1, 3)), ("y", slice(3, 5)))
    }
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
    close: bool  # the spacing that goes with high shear

    @property
    def phi_V_n(self) -> float:
        return 0.75 * (self.V_c + self.V_s)

    @property
    def required(self) -> bool:
        """10.6.2.1."""
        return self.V_u > 0.5 * 0.75 * self.V_c


def _tension_side(column: Row, axis: str) -> tuple[float, float, int]:
    """b_w, d, and the bars further than two thirds of the depth from the compressed face (R22.5.5.1)."""
    b, h, bars = column["b"], column["h"], bar_centres(column)
    if b is None:  # 22.5.2.2; the fewest bars that may lie there, whichever way the shear acts
        arc = 2 * math.acos(h / 6 / float(np.hypot(*bars[0])))
        return h, 0.8 * h, math.floor(arc * len(bars) / (2 * math.pi))
    b_w, deep = (b, h) if axis == "y" else (h, b)
    depths = deep / 2 + bars[:, 1 if axis == "y" else 0]
    far = depths[depths > 2 / 3 * deep]
    return b_w, float(far.mean()), len(far)


def shear(column: Row, edition: str, P: float, V_u: float, axis: str) -> Shear:
    """22.5 with axial force, 10.6.2 and Table 10.7.6.5.2, along `axis`; of the resultant where the column is round."""
    f_c, s, A_g = column["f_c"], column["spacing"], gross_area(column)
    b_w, d, count = _tension_side(column, axis)
    A_v = (2 if column["b"] is None else column[f"legs_{axis}"]) * SIZES[column["tie"]][1]  # 22.5.10.5
    f_yt = min(column["f_yt"], 60000)  # Table 20.2.2.4a
    A_v_min = max(0.75 * math.sqrt(f_c), 50) * b_w * s / f_yt
    rooted = column["lambda"] * min(math.sqrt(f_c), 100.0)  # 22.5.3.1: in V_c alone
    if edition == "14":
        stress = 2 * (1 + P / ((2000 if P >= 0 else 500) * A_g)) * rooted  # 22.5.6.1, 22.5.7.1
    else:  # Table 22.5.5.1
        lambda_s = min(math.sqrt(2 / (1 + d / 10)), 1.0)
        rho_w = SIZES[column["size"]][1] * count / (b_w * d)
        times = 2.0 if A_v >= A_v_min * (1 - NOISE) else 8 * lambda_s * rho_w ** (1 / 3)
        stress = min(times * rooted + min(P / (6 * A_g), 0.05 * f_c), 5 * rooted)
    V_c, V_s = max(stress, 0.0) * b_w * d, A_v * f_yt * d / s
    close = V_u / 0.75 - V_c > 4 * math.sqrt(f_c) * b_w * d
    s_max = min(d / 4, 12) if close else min(d / 2, 24)
    V_u_max = 0.75 * (V_c + 8 * math.sqrt(f_c) * b_w * d)
    return Shear(V_u, V_c, V_s, V_u_max, A_v, A_v_min, s_max, close)


# Detailing


def pitches(column: Row) -> list[float]:
    """Centre to centre of neighbouring bars: along the faces parallel to x and to y, or round the circle."""
    if column["b"] is None:
        first, second = bar_centres(column)[:2]
        return [float(np.hypot(*(second - first)))]
    inset = column["cover"] + SIZES[column["tie"]][0] + SIZES[column["size"]][0] / 2
    return [(column["b"] - 2 * inset) / (column["n_x"] - 1), (column["h"] - 2 * inset) / (column["n_y"] - 1)]


def detailing(column: Row) -> dict[str, float]:
    """What is set over what is allowed, by the names of the checks."""
    d_b, (d_bt, A_bt), s = SIZES[column["size"]][0], SIZES[column["tie"]], column["spacing"]
    stone = 4 / 3 * column["aggregate"]
    rho = steel_area(column) / gross_area(column)
    found = {
        "reinforcement ratio": max(0.01 / rho, rho / 0.08),  # 10.6.1.1
        "number of bars": (6 if column["spiral"] else 4) / column["bars"],  # 10.7.3.1
        "bar spacing": max(1.5, 1.5 * d_b, stone) / (min(pitches(column)) - d_b),  # 25.2.3
    }
    if column["spiral"]:
        core = column["h"] - 2 * column["cover"]
        rho_s = math.pi * (core - d_bt) * A_bt / (s * math.pi / 4 * core**2)
        least = 0.45 * ((column["h"] / core) ** 2 - 1) * column["f_c"] / min(column["f_yt"], 100000)
        return found | {
            "spiral size": 0.375 / d_bt,  # 25.7.3.2
            "spiral pitch": max((s - d_bt) / 3, max(1.0, stone) / (s - d_bt)),  # 25.7.3.1
            "spiral ratio": least / rho_s,  # 25.7.3.3
        }
    side = column["h"] if column["b"] is None else min(column["b"], column["h"])
    return found | {
        "tie size": (0.375 if column["size"] <= 10 else 0.5) / d_bt,  # 25.7.2.2
        "tie spacing": max(s / min(16 * d_b, 48 * d_bt, side), stone / (s - d_bt)),  # 25.7.2.1
    }


def faces(column: Row) -> list[tuple[float, int, int]]:
    """Of both kinds of face: the bars' pitch, how many there are, and how many a leg across the column holds."""
    along_x, along_y = pitches(column)
    n_x, n_y = column["n_x"], column["n_y"]
    return [(along_x, n_x, min(column["legs_y"], n_x)), (along_y, n_y, min(column["legs_x"], n_y))]


def laterally_supported(column: Row) -> bool:
    """25.7.2.3: corners and every other bar held, and no bar further than 6 in clear from one that is."""
    d_b = SIZES[column["size"]][0]
    return all(held == n or (pitch - d_b <= 6 and 2 * held >= n + 1) for pitch, n, held in faces(column))


# Special moment frames


def special(column: Row, edition: str, P_max: float) -> dict[str, float]:
    """18.7.2 to 18.7.5: what is set over what is allowed, by the names of the checks; and l_o in in."""
    h, f_c, f_y, s = column["h"], column["f_c"], column["f_y"], column["spacing"]
    short, long = min(column["b"] or h, h), max(column["b"] or h, h)
    rho, d_b = steel_area(column) / gross_area(column), SIZES[column["size"]][0]
    heavy = P_max > 0.3 * gross_area(column) * f_c or f_c > 10000
    times = 5 if edition == "19" and f_y > 60000 else 6
    if column["b"] is None:
        h_x, all_held = pitches(column)[0], 0.0
    else:  # crossties spread as evenly as the bars allow
        h_x = max(pitch * math.ceil((n - 1) / (held - 1)) for pitch, n, held in faces(column))
        all_held = max(n / held for _, n, held in faces(column)) if heavy else 0.0
    s_o = min(max(4 + (14 - h_x) / 3, 4.0), 6.0)
    return {
        "length l_o": max(long, (column["l_u"] or 0.0) / 6, 18.0),  # 18.7.5.1
        "dimensions": max(12.0, 0.4 * long if column["b"] else 0.0) / short,  # 18.7.2.1
        "materials": max(3000 / f_c, f_y / (60000 if edition == "14" else 80000)),  # 19.2.1.1, Table 20.2.2.4a
        "reinforcement ratio": max(0.01 / rho, rho / 0.06),  # 18.7.4.1
        "spacing of held bars": max(h_x / (8 if all_held else 14), all_held),  # 18.7.5.2(e), (f)
        "spacing within l_o": s / min(short / 4, times * d_b, s_o),  # 18.7.5.3
        "spacing outside l_o": column.get("beyond", s) / min(times * d_b, 6.0),  # 18.7.5.5
        **_confinement(column, P_max, heavy),
    }


def _confinement(column: Row, P_max: float, heavy: bool) -> dict[str, float]:
    """Table 18.7.5.4; b_c and A_ch to the outside of the hoops, n_l the bars that are held."""
    f_c, f_yt, (d_bt, A_bt) = column["f_c"], min(column["f_yt"], 100000), SIZES[column["tie"]]
    k_f = max(f_c / 25000 + 0.6, 1.0)
    core_y = column["h"] - 2 * column["cover"]
    if column["b"] is None:
        A_ch = math.pi / 4 * core_y**2
        by_force = 0.35 * k_f * P_max / A_ch if heavy else 0.0
        least = max(0.45 * (gross_area(column) / A_ch - 1) * f_c, 0.12 * f_c, by_force) / f_yt
        return {"confinement": least / (A_bt * math.pi * (core_y - d_bt) / (column["spacing"] * A_ch))}
    core_x = column["b"] - 2 * column["cover"]
    A_ch = core_x * core_y
    n_l = sum(2 * held for _, _, held in faces(column)) - 4
    by_force = 0.2 * k_f * n_l / (n_l - 2) * P_max / A_ch if heavy else 0.0
    least = max(0.3 * (gross_area(column) / A_ch - 1) * f_c, 0.09 * f_c, by_force) / f_yt
    return {
        "confinement, x": least * column["spacing"] * core_y / (column["legs_x"] * A_bt),
        "confinement, y": least * column["spacing"] * core_x / (column["legs_y"] * A_bt),
    }
