"""A reinforced section: outline with openings or a circle, bars, materials. Moments act about the gross centroid."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property
from itertools import pairwise
from math import pi

import numpy as np
from numpy.typing import ArrayLike, NDArray

from calcpack.errors import RangeError
from calcpack.mechanics.outlines import Floats, area_and_centroid, counterclockwise
from calcpack.mechanics.section_problems import section_problems

__all__ = ["Section", "circle", "polygon", "rectangle"]

_YIELD_IN_P_O = 80_000.0


@dataclass(frozen=True, eq=False, kw_only=True)
class Section:
    """A section as its drawing states it; `x` and `y` of the bars and the loops are about the gross centroid.

    Attributes
    ----------
    bars : one row a bar: x, y and area, in and in^2, from any origin (a circle: from its centre)
    f_c, f_y : concrete strength and yield strength, psi
    outline : vertices (n, 2) of a simple polygon, in, either sense; None for a circle
    openings : vertices of each opening, inside the outline
    diameter : of a circle, in; None for a polygon
    d_b : bar diameters, in; empty where unknown, and then only the centres of bars are checked
    E_s, eps_cu : modulus of the bars, psi, and extreme concrete strain

    Raises
    ------
    RangeError : every problem of the section at once
    """

    bars: Floats
    f_c: float
    f_y: float
    outline: Floats | None = None
    openings: tuple[Floats, ...] = ()
    diameter: float | None = None
    d_b: Floats | None = None
    E_s: float = 29e6
    eps_cu: float = 0.003

    def __post_init__(self) -> None:
        problems = section_problems(self)
        if problems:
            raise RangeError("section", problems)

    @cached_property
    def _gross(self) -> tuple[float, Floats]:
        if self.diameter is not None:
            return pi / 4 * self.diameter**2, np.zeros(2)
        parts = [area_and_centroid(loop) for loop in self._raw_loops]
        area = sum(part for part, _ in parts)
        weighted = np.array([part * centroid for part, centroid in parts])
        return area, weighted.sum(axis=0) / area

    @cached_property
    def _raw_loops(self) -> tuple[Floats, ...]:
        if self.outline is None:
            return ()
        return (counterclockwise(self.outline), *(counterclockwise(opening)[::-1] for opening in self.openings))

    @property
    def A_g(self) -> float:
        """Gross area, openings deducted, in^2."""
        return self._gross[0]

    @property
    def centroid(self) -> Floats:
        """Centroid of the gross section in the coordinates of the drawing, in."""
        return self._gross[1]

    @cached_property
    def loops(self) -> tuple[Floats, ...]:
        """Outline counterclockwise and openings clockwise, about the centroid; empty for a circle."""
        return tuple(loop - self.centroid for loop in self._raw_loops)

    @cached_property
    def edges(self) -> tuple[Floats, Floats]:
        """Start and end vertices of all sides of all loops."""
        ends = [np.roll(loop, -1, axis=0) for loop in self.loops]
        return np.concatenate(self.loops), np.concatenate(ends)

    @cached_property
    def following(self) -> NDArray[np.intp]:
        """For each start vertex of `edges`, the place of the next one of its loop."""
        firsts = np.cumsum([0, *map(len, self.loops)])
        return np.concatenate([np.roll(np.arange(a, b), -1) for a, b in pairwise(firsts)])

    @cached_property
    def extent(self) -> tuple[float, float]:
        """Overall size along x and along y, in."""
        if self.diameter is not None:
            return self.diameter, self.diameter
        width, depth = np.ptp(self.loops[0], axis=0)
        return float(width), float(depth)

    @cached_property
    def x(self) -> Floats:
        """Bars along x from the centroid, in."""
        return np.ascontiguousarray(self.bars[:, 0] - self.centroid[0])

    @cached_property
    def y(self) -> Floats:
        """Bars along y from the centroid, in."""
        return np.ascontiguousarray(self.bars[:, 1] - self.centroid[1])

    @cached_property
    def A_b(self) -> Floats:
        """Area of each bar, in^2."""
        return np.ascontiguousarray(self.bars[:, 2])

    @cached_property
    def A_st(self) -> float:
        """Total area of bars, in^2."""
        return float(self.A_b.sum())

    @property
    def beta_1(self) -> float:
        """Depth of the block over depth of the neutral axis, ACI 318 Table 22.2.2.4.3."""
        return min(0.85, max(0.65, 0.85 - 0.05 * (self.f_c - 4000) / 1000))

    @property
    def P_o(self) -> float:
        """Nominal axial strength at zero eccentricity, lb; f_y counts up to 80,000 psi (ACI 318-19 22.4.2.1)."""
        return 0.85 * self.f_c * (self.A_g - self.A_st) + min(self.f_y, _YIELD_IN_P_O) * self.A_st

    @property
    def P_nt_max(self) -> float:
        """Nominal axial strength in tension, lb, as a positive number (ACI 318 22.4.3.1)."""
        return self.f_y * self.A_st


def polygon(
    outline: ArrayLike,
    bars: ArrayLike,
    *,
    f_c: float,
    f_y: float,
    openings: Sequence[ArrayLike] = (),
    d_b: ArrayLike | None = None,
) -> Section:
    """A section of any simple outline, with openings; arguments as in `Section`."""
    return Section(
        bars=_rows(bars),
        f_c=f_c,
        f_y=f_y,
        outline=_rows(outline),
        openings=tuple(_rows(opening) for opening in openings),
        d_b=_diameters(d_b, bars),
    )


def rectangle(b: float, h: float, bars: ArrayLike, *, f_c: float, f_y: float, d_b: ArrayLike | None = None) -> Section:
    """A rectangle, b along x and h along y, bars from its centre; other arguments as in `Section`.

    >>> rectangle(12, 20, [(-3, -7, 2.0), (3, 7, 2.0)], f_c=4000, f_y=60_000).P_o
    1042400.0
    """
    outline = np.array([(-b, -h), (b, -h), (b, h), (-b, h)], dtype=float) / 2
    return polygon(outline, bars, f_c=f_c, f_y=f_y, d_b=d_b)


def circle(h: float, bars: ArrayLike, *, f_c: float, f_y: float, d_b: ArrayLike | None = None) -> Section:
    """A circle of diameter h, bars from its centre; other arguments as in `Section`."""
    return Section(bars=_rows(bars), f_c=f_c, f_y=f_y, diameter=float(h), d_b=_diameters(d_b, bars))


def _rows(given: ArrayLike) -> Floats:
    return np.array(given, dtype=float)


def _diameters(d_b: ArrayLike | None, bars: ArrayLike) -> Floats | None:
    return None if d_b is None else np.broadcast_to(np.array(d_b, dtype=float), (len(np.asarray(bars)),)).copy()
