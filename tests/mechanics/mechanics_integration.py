"""Strength a second time, sharing nothing with the package: shapely clips the block, scipy integrates and searches.

One neutral axis, one load at a time; constants are written out again.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from math import asin, cos, pi, sin

import numpy as np
from scipy.integrate import quad
from scipy.optimize import brentq, root
from shapely.geometry import Polygon

Vector = tuple[float, float, float]


@dataclass(frozen=True)
class Plain:
    """A section about its gross centroid: a polygon of shapely, or a circle of that radius; bars x, y, area."""

    shape: Polygon | None
    radius: float
    bars: list[Vector]
    f_c: float
    f_y: float

    @property
    def beta_1(self) -> float:
        """Linear between 4,000 and 8,000 psi, ACI 318-19 Table 22.2.2.4.3."""
        return float(np.interp(self.f_c, [4000, 8000], [0.85, 0.65]))


def plain(outline: list, openings: list, bars: list, f_c: float, f_y: float) -> Plain:
    """From the coordinates of a drawing."""
    drawn = Polygon(outline, openings)
    x, y = drawn.centroid.x, drawn.centroid.y
    shifted = Polygon([(a - x, b - y) for a, b in outline], [[(a - x, b - y) for a, b in hole] for hole in openings])
    return Plain(shifted, 0.0, [(a - x, b - y, area) for a, b, area in bars], f_c, f_y)


def strength(section: Plain, theta: float, c: float) -> tuple[Vector, float]:
    """Nominal P, Mx, My and the strain of the extreme tension bar, tension positive."""
    n = cos(theta), sin(theta)
    if section.shape is None:
        extreme = section.radius
    else:
        extreme = max(n[0] * x + n[1] * y for x, y in section.shape.exterior.coords)
    a = section.beta_1 * c
    area, S_x, S_y = _block(section, n, extreme - a)
    P, Mx, My = (0.85 * section.f_c * part for part in (area, S_y, S_x))
    strains = []
    for x, y, A_b in section.bars:
        d = extreme - n[0] * x - n[1] * y
        strain = 0.003 * (c - d) / c
        stress = max(-section.f_y, min(section.f_y, 29e6 * strain))
        force = A_b * (stress - (0.85 * section.f_c if d < a else 0.0))
        P, Mx, My = P + force, Mx + force * y, My + force * x
        strains.append(strain)
    return (P, Mx, My), -min(strains)


def _block(section: Plain, n: tuple[float, float], q: float) -> Vector:
    """Area, integral of x, integral of y beyond the line n.p = q."""
    if section.shape is None:
        return _segment(section.radius, n, q)
    far = 1e4
    corners = [(q, -far), (q + far, -far), (q + far, far), (q, far)]
    cut = section.shape.intersection(Polygon([(n[0] * u - n[1] * v, n[1] * u + n[0] * v) for u, v in corners]))
    return cut.area, cut.area * cut.centroid.x if cut.area else 0.0, cut.area * cut.centroid.y if cut.area else 0.0


def _segment(radius: float, n: tuple[float, float], q: float) -> Vector:
    # With u = R sin t the chord is 2 R cos t, smooth to the very end.
    low = asin(max(-1.0, min(1.0, q / radius)))
    area, _ = quad(lambda t: 2 * radius**2 * cos(t) ** 2, low, pi / 2)
    first, _ = quad(lambda t: 2 * radius**3 * sin(t) * cos(t) ** 2, low, pi / 2)
    return area, first * n[0], first * n[1]


def ray_strengths(
    section: Plain, phi: Callable[[float], float], load: Vector, scale: Vector, starts: int = 8
) -> list[float]:
    """Design strengths over the load along its ray, from a root search at the best of a grid of neutral axes."""
    wanted = np.array(load) / scale
    length = float(np.linalg.norm(wanted))
    wanted /= length

    def off(unknown: list[float]) -> list[float]:
        forces = np.array(strength(section, unknown[0], float(np.exp(unknown[1])))[0]) / scale
        return list((forces - (forces @ wanted) * wanted)[np.argsort(np.abs(wanted))[:2]])

    size = scale[1] / scale[0] + scale[2] / scale[0]
    grid = [(theta, float(np.log(size * c))) for theta in np.arange(32) * pi / 16 for c in np.geomspace(0.05, 4, 14)]
    found = []
    for start in sorted(grid, key=lambda at: -_toward(section, at, wanted, scale))[:starts]:
        solution = root(off, start, tol=1e-12)
        forces, eps_t = strength(section, solution.x[0], float(np.exp(solution.x[1])))
        along = float(np.array(forces) / scale @ wanted)
        if max(abs(part) for part in off(list(solution.x))) < 1e-9 and along > 0:
            found.append(phi(eps_t) * along / length)
    return found


def _toward(section: Plain, at: tuple[float, float], wanted: np.ndarray, scale: Vector) -> float:
    forces = np.array(strength(section, at[0], float(np.exp(at[1])))[0]) / scale
    return float(forces @ wanted / np.linalg.norm(forces))


def moment_at(section: Plain, phi: Callable[[float], float], P: float, theta: float, depth: float) -> Vector:
    """Design P, Mx, My at a direction of the neutral axis and a level P, by a search for c between 0 and 20 depths."""

    def beyond(c: float) -> float:
        forces, eps_t = strength(section, theta, c)
        return phi(eps_t) * forces[0] - P

    c = brentq(beyond, 1e-6 * depth, 20 * depth, xtol=1e-13, rtol=1e-14)
    forces, eps_t = strength(section, theta, c)
    factor = phi(eps_t)
    return factor * forces[0], factor * forces[1], factor * forces[2]


def phi_318_19(f_y: float, phi_c: float = 0.65) -> Callable[[float], float]:
    """ACI 318-19 Table 21.2.2."""
    return lambda eps_t: float(np.interp(eps_t, [f_y / 29e6, f_y / 29e6 + 0.003], [phi_c, 0.9]))
