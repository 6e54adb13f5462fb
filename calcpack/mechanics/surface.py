"""The design interaction surface of a section, and load points against it.

The surface is nominal strength times phi, cut at the maximum axial strength. phi scales a strength along its ray from
the origin, so the region it bounds is left once along every ray; that gives `ratio`. At a constant axial force the
region may have a notch where phi changes; `moment_ratio` counts the first moment at which the load leaves it.
"""

from __future__ import annotations

from dataclasses import dataclass, fields
from functools import cached_property

import numpy as np
from numpy.typing import ArrayLike

from calcpack.errors import Problem, RangeError
from calcpack.mechanics.block import frame
from calcpack.mechanics.outlines import Bools, Floats
from calcpack.mechanics.reduction import Rule
from calcpack.mechanics.search import Found
from calcpack.mechanics.section import Section
from calcpack.mechanics.solving import governing
from calcpack.mechanics.strength import cut_section, nominal
from calcpack.mechanics.table import Table, sample
from calcpack.mechanics.targets import Levels, Rays, scale_of

__all__ = ["Checked", "Surface"]

_AT_ONCE = 1000
_ON_AXIS = 1e-9
_CLEARLY = 1.15
# No moment exceeds P_o times the size of the section along its lever, of which the scale is a quarter.
_BEYOND = 8.0
_HALVINGS = 48
# The last one tells whether the moment found leads out of the region, or from a notch back into it.
_LOOKS = (0.0, 0.25, 0.5, 0.7, 0.85, 0.95, 0.9999)


@dataclass(frozen=True)
class Checked:
    """Load points against a design surface; arrays (n,), in the order of the loads.

    Attributes
    ----------
    P, Mx, My : the loads, lb and lb*in
    ratio : load over design strength along the ray from the origin
    capped : whether the maximum axial strength, not the neutral axis below, governs `ratio`
    theta, c : neutral axis where the ray meets the surface before the cut: direction of the compressed face, rad,
        and depth, in. Along the ray of pure compression or tension theta is NaN and c infinite or 0. Where the cut
        governs and no neutral axis is needed, both may be NaN.
    eps_t, phi : strain of the extreme tension bar there, tension positive, and strength reduction factor
    P_n, M_nx, M_ny : nominal strength there
    """

    P: Floats
    Mx: Floats
    My: Floats
    ratio: Floats
    capped: Bools
    theta: Floats
    c: Floats
    eps_t: Floats
    phi: Floats
    P_n: Floats
    M_nx: Floats
    M_ny: Floats

    @property
    def governing(self) -> int:
        """Index of the largest ratio; the first of equal ones."""
        return int(self.ratio.argmax())


@dataclass(frozen=True, eq=False)
class Surface:
    """The design surface of a section under a rule; the table behind it is made at the first check."""

    section: Section
    rule: Rule

    @property
    def P_o(self) -> float:
        """Nominal axial strength at zero eccentricity, lb."""
        return self.section.P_o

    @property
    def phi_P_n_max(self) -> float:
        """Maximum design axial strength, lb."""
        return self.rule.phi_c * self.rule.alpha * self.P_o

    @cached_property
    def axial_limits(self) -> tuple[float, float]:
        """Least (tension, negative) and largest design axial force without moment, lb."""
        alone = self._along_rays(np.array([[-self.P_o, self.P_o], [0.0, 0.0], [0.0, 0.0]]))
        compression = self.phi_P_n_max if alone.capped[1] else self.P_o / alone.ratio[1]
        return float(-self.P_o / alone.ratio[0]), float(compression)

    def check(self, P: ArrayLike, Mx: ArrayLike, My: ArrayLike) -> Checked:
        """Ratios along the ray, and neutral axes, of load points: arrays (n,), lb and lb*in, compression positive.

        Raises
        ------
        RangeError : a force that is not a finite number; all of them, by their place in the arrays
        """
        parts = [self._along_rays(chunk) for chunk in _chunks(P, Mx, My)]
        names = [field.name for field in fields(Checked)]
        return Checked(**{name: np.concatenate([getattr(part, name) for part in parts]) for name in names})

    def moment_ratio(self, P: ArrayLike, Mx: ArrayLike, My: ArrayLike) -> Floats:
        """Moment over design moment at constant P, (n,); NaN where P alone exceeds the strength; else as `check`."""
        return np.concatenate([self._at_levels(chunk) for chunk in _chunks(P, Mx, My)])

    def contour(self, P: float, angles: ArrayLike) -> tuple[Floats, Floats]:
        """Design moments Mx, My at a constant P, for directions atan2(Mx, My) of moment; NaN where P alone exceeds."""
        angle = np.atleast_1d(np.array(angles, float))
        unit = self.section.P_o * np.stack([np.sin(angle), np.cos(angle)])
        ratio = self._at_levels(np.stack([np.full(angle.shape, float(P)), *unit]))
        return unit[0] / ratio, unit[1] / ratio

    def meridian(self, Mx: float, My: float, count: int = 181) -> tuple[Floats, Floats]:
        """Design axial force and moment in the half plane of a moment (Mx, My), from pure tension to compression.

        Raises
        ------
        RangeError : no moment, so that there is no plane
        """
        size, whole = sum(self.section.extent) / 8, float(np.hypot(Mx, My))
        if not 0 < whole < np.inf:
            raise RangeError("meridian", [Problem(f"Mx = {Mx}, My = {My}", "a moment", "say in which plane to look")])
        rise = np.linspace(-np.pi / 2, np.pi / 2, count)
        P, M = self.P_o * np.sin(rise), self.P_o * size * np.cos(rise)
        M[[0, -1]] = 0.0
        ratio = self._along_rays(np.stack([P, M * Mx / whole, M * My / whole])).ratio
        return P / ratio, M / ratio

    @cached_property
    def _scale(self) -> Floats:
        return scale_of(self.section)

    @cached_property
    def _table(self) -> Table:
        return sample(self.section, self.rule)

    @cached_property
    def _poles(self) -> Floats:
        """Scaled nominal strength in pure tension and pure compression, (3, 2)."""
        pole = nominal(self.section, 0.0, [0.0, np.inf])
        return np.stack([pole.P, pole.Mx, pole.My]) / self._scale

    def _along_rays(self, loads: Floats) -> Checked:
        scaled = loads / self._scale
        length = np.linalg.norm(scaled, axis=0)
        along = scaled / np.maximum(length, np.finfo(float).tiny)
        theta, c, ratio = (np.full(length.shape, np.nan) for _ in range(3))
        cap = loads[0] / self.phi_P_n_max
        self._on_poles(along, c)
        rays = np.flatnonzero(np.isnan(c) & (length > 0))
        found = self._meet(along[:, rays], length[rays], cap[rays])
        theta[rays], c[rays] = found.theta, found.c
        cut = cut_section(self.section, frame(self.section, np.nan_to_num(theta)), c)
        phi = self.rule.phi(cut.eps_t)
        ratio = length / (phi * (along * (cut.forces / self._scale)).sum(axis=0))
        ratio[length == 0] = 0.0
        capped = (cap > 0) & ~(ratio >= cap)
        ratio = np.where(capped, cap, ratio)
        P, Mx, My = loads
        P_n, M_nx, M_ny = cut.forces
        return Checked(P, Mx, My, ratio, capped, theta, c, cut.eps_t, phi, P_n, M_nx, M_ny)

    def _on_poles(self, along: Floats, c: Floats) -> None:
        """Set c where the ray is that of pure tension or pure compression: there every theta is the same."""
        for pole, depth in zip(self._poles.T, (0.0, np.inf), strict=True):
            direction = pole / np.linalg.norm(pole)
            c[np.linalg.norm(along - direction[:, None], axis=0) < _ON_AXIS] = depth

    def _meet(self, along: Floats, length: Floats, cap: Floats) -> Found:
        rays = Rays.through(self.rule, self._scale, self._poles, along)
        start = self._table.nearest_to_rays(along)
        # Near pure compression the neutral axis is ill defined, and the cut governs whatever it is.
        needed = cap < _CLEARLY * length / self._table.design[start]
        found = governing(self.section, rays, [(self._table.theta[start], self._table.c[start])], needed)
        _refuse_lost(along * length * self._scale, needed & ~found.holds)
        return found

    def _at_levels(self, loads: Floats) -> Floats:
        """Moment over design moment at the axial force of each load."""
        P = loads[0]
        moment = loads[1:] / self._scale[1:]
        length = np.hypot(*moment)
        least, most = self.axial_limits
        ratio = np.where((least <= P) & (most >= P) & (length == 0), 0.0, np.nan)
        asked = np.flatnonzero((least < P) & (most >= P) & (length > 0))
        if asked.size:
            ratio[asked] = length[asked] / self._moments(P[asked], moment[:, asked] / length[asked])
        return ratio

    def _moments(self, P: Floats, along: Floats) -> Floats:
        """Scaled design moments at axial forces (n,), along unit vectors of scaled moment (2, n)."""
        levels = Levels(self.rule, self._scale, P, along)
        starts = self._table.starts_at_levels(self.rule, P / self.P_o, along)
        found = governing(self.section, levels, starts, np.ones(P.size, dtype=bool))
        lost = np.flatnonzero(~found.holds)
        if lost.size:
            # Where the contour at P nearly shrinks to a point.
            ends = np.zeros(lost.size), np.full(lost.size, _BEYOND)
            found.strength[lost] = self._first_exit(P[lost], along[:, lost], *ends)
        return self._before_notches(P, along, found.strength) if self._table.folds else found.strength

    def _before_notches(self, P: Floats, along: Floats, moments: Floats) -> Floats:
        """The moments, or a smaller one where a load on the way to them lies outside already."""
        shares = np.array(_LOOKS)
        looks = [~self._inside(P, along, share * moments) for share in shares[1:]]
        outside = np.stack([np.zeros(P.shape, dtype=bool), *looks])
        notched = np.flatnonzero(outside.any(axis=0))
        if notched.size:
            first = outside[:, notched].argmax(axis=0)
            low, high = shares[first - 1] * moments[notched], shares[first] * moments[notched]
            moments[notched] = self._first_exit(P[notched], along[:, notched], low, high)
        return moments

    def _first_exit(self, P: Floats, along: Floats, low: Floats, high: Floats) -> Floats:
        """Moments at which loads leave the region, by bisection between inside and outside."""
        for _ in range(_HALVINGS):
            middle = (low + high) / 2
            inside = self._inside(P, along, middle)
            low, high = np.where(inside, middle, low), np.where(inside, high, middle)
        return high

    def _inside(self, P: Floats, along: Floats, moment: Floats) -> Bools:
        inside: Bools = self._along_rays(np.stack([P, *(moment * along * self._scale[1:])])).ratio <= 1
        return inside


def _chunks(P: ArrayLike, Mx: ArrayLike, My: ArrayLike) -> list[Floats]:
    """The loads in pieces (3, n) that bound the memory a check needs."""
    loads = np.stack(np.broadcast_arrays(*(np.atleast_1d(np.array(part, float)) for part in (P, Mx, My))))
    _refuse_not_finite(loads)
    return [loads[:, i : i + _AT_ONCE] for i in range(0, max(loads.shape[1], 1), _AT_ONCE)]


def _refuse_not_finite(loads: Floats) -> None:
    problems = [
        Problem(f"{name}[{place}] = {row[place]}", "a finite number", "correct the force")
        for name, row in zip(("P", "Mx", "My"), loads, strict=True)
        for place in np.flatnonzero(~np.isfinite(row))
    ]
    if problems:
        raise RangeError("forces", problems)


def _refuse_lost(loads: Floats, lost: Bools) -> None:
    problems = [
        Problem(
            f"P = {P:g} lb, Mx = {Mx:g}, My = {My:g} lb*in", "a load that some neutral axis balances", "check the bars"
        )
        for P, Mx, My in loads[:, lost].T
    ]
    if problems:
        raise RangeError("no neutral axis found", problems)
