"""What a neutral axis is sought for: a ray from the origin, or a level of axial force and a direction of moment.

Forces are scaled: P by P_o, moments by P_o and a quarter of the section's size along their lever. Rays stay rays.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Protocol

import numpy as np
from numpy.typing import NDArray

from calcpack.mechanics.outlines import Floats
from calcpack.mechanics.reduction import Rule
from calcpack.mechanics.section import Section
from calcpack.mechanics.strength import Cut

__all__ = ["Indices", "Levels", "Linear", "Rays", "Target", "scale_of", "turned_from"]

Indices = NDArray[np.intp]


@dataclass(frozen=True)
class Linear:
    """Two equations at their present neutral axes, and their change with theta and q; (2, n) each."""

    error: Floats
    turn: Floats
    move: Floats


class Target(Protocol):
    """A set of load points, each asking for a neutral axis."""

    def equations(self, cut: Cut, which: Indices) -> Linear:
        """What is to vanish, for the loads of index `which`."""
        ...

    def strength(self, cut: Cut, which: Indices) -> Floats:
        """The scaled design strength along the load, where the equations hold; negative on the far side."""
        ...

    def rise(self, cut: Cut, which: Indices) -> Floats:
        """Negative where c is too small, positive where it is too large, for any theta."""
        ...

    def swing(self, cut: Cut, which: Indices) -> Floats:
        """The angle by which the moment lies beyond the load's, where `rise` is 0, in (-pi, pi]."""
        ...


def scale_of(section: Section) -> Floats:
    """What P, Mx, My are divided by, (3, 1)."""
    width, depth = section.extent
    return section.P_o * np.array([[1.0], [depth / 4], [width / 4]])


@dataclass(frozen=True)
class Rays:
    """Directions of load points from the origin: unit vectors `along`, with two square to each; (3, n)."""

    rule: Rule
    scale: Floats
    poles: Floats
    along: Floats
    first: Floats
    second: Floats

    @classmethod
    def through(cls, rule: Rule, scale: Floats, poles: Floats, along: Floats) -> Rays:
        """Rays along unit vectors (3, n); `poles` are scaled pure tension and pure compression, (3, 2)."""
        axis = np.eye(3)[np.abs(along).argmin(axis=0)].T
        first = np.cross(along, axis, axis=0)
        first /= np.linalg.norm(first, axis=0)
        return cls(rule, scale, poles, along, first, np.cross(along, first, axis=0))

    def equations(self, cut: Cut, which: Indices) -> Linear:
        """The two components of strength square to the ray."""
        square = np.stack([self.first[:, which], self.second[:, which]])
        turn, move = cut.slopes
        return Linear(*((square * (part / self.scale)).sum(axis=1) for part in (cut.forces, turn, move)))

    def strength(self, cut: Cut, which: Indices) -> Floats:
        """Design strength along the ray."""
        along: Floats = (self.along[:, which] * (cut.forces / self.scale)).sum(axis=0) * self.rule.phi(cut.eps_t)
        return along

    def rise(self, cut: Cut, which: Indices) -> Floats:
        """Elevation over the plane P = 0, beyond that of the ray."""
        wanted = _elevation(self._centred(self.along[:, which]))
        beyond: Floats = _elevation(self._centred(cut.forces / self.scale)) - wanted
        return beyond

    def swing(self, cut: Cut, which: Indices) -> Floats:
        """From the ray's moment to that of the strength."""
        return turned_from(self._centred(self.along[:, which])[1:], self._centred(cut.forces / self.scale)[1:])

    def _centred(self, forces: Floats) -> Floats:
        # With moments about the plastic centroid, and in tension about that of the bars, every direction theta leads
        # from -90 to +90 degrees of elevation, however unsymmetric the section.
        in_tension, in_compression = (self.poles[1:] / self.poles[0]).T[..., None]
        shift = np.where(forces[0] < 0, in_tension * forces[0], in_compression * forces[0])
        return np.concatenate([forces[:1], forces[1:] - shift])


def _elevation(forces: Floats) -> Floats:
    elevation: Floats = np.arctan2(forces[0], np.hypot(forces[1], forces[2]))
    return elevation


@dataclass(frozen=True)
class Levels:
    """Axial forces (n,), as they are, and unit vectors of scaled moment (2, n)."""

    rule: Rule
    scale: Floats
    P: Floats
    along: Floats

    def equations(self, cut: Cut, which: Indices) -> Linear:
        """Design axial strength less the load, and the moment square to the load's."""
        phi, slope = self.rule.phi(cut.eps_t), self.rule.slope(cut.eps_t)
        forces, P_o = cut.forces, self.scale[0]
        level = (phi * forces[0] - self.P[which]) / P_o
        rows = [np.stack([level, self._square(forces, which)])]
        for part, eps_t in zip(cut.slopes, cut.eps_t_slopes, strict=True):
            change = (phi * part[0] + slope * eps_t * forces[0]) / P_o
            rows.append(np.stack([change, self._square(part, which)]))
        return Linear(*rows)

    def _square(self, forces: Floats, which: Indices) -> Floats:
        x, y = forces[1:] / self.scale[1:]
        along = self.along[:, which]
        square: Floats = along[0] * y - along[1] * x
        return square

    def strength(self, cut: Cut, which: Indices) -> Floats:
        """Design moment strength along the load's moment."""
        moments = self.rule.phi(cut.eps_t) * cut.forces[1:] / self.scale[1:]
        along: Floats = (self.along[:, which] * moments).sum(axis=0)
        return along

    def rise(self, cut: Cut, which: Indices) -> Floats:
        """Design axial strength beyond the load."""
        beyond: Floats = (self.rule.phi(cut.eps_t) * cut.forces[0] - self.P[which]) / self.scale[0]
        return beyond

    def swing(self, cut: Cut, which: Indices) -> Floats:
        """From the load's moment to that of the strength."""
        return turned_from(self.along[:, which], cut.forces[1:] / self.scale[1:])


def turned_from(one: Floats, other: Floats) -> Floats:
    """Angle from one plane vector to another, (2, n) each, in (-pi, pi]."""
    angle: Floats = np.arctan2(one[1] * other[0] - one[0] * other[1], (one * other).sum(axis=0))
    return angle
