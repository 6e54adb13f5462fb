"""The interaction surface sampled once a section: where the search for a load point starts."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from calcpack.mechanics.block import frame
from calcpack.mechanics.outlines import Floats
from calcpack.mechanics.reduction import Rule
from calcpack.mechanics.section import Section
from calcpack.mechanics.strength import cut_section
from calcpack.mechanics.targets import Indices, scale_of

__all__ = ["THETAS", "Table", "sample"]

# Quarter turns are exactly among them: uniaxial bending of a symmetric section starts on its answer.
THETAS = np.arange(-20, 20) * (np.pi / 20)
_DEPTHS = np.concatenate([[0.01, 0.03, 0.06], np.linspace(0.1, 1.3, 17), [1.5, 1.8, 2.4, 3.2, 6.0]])
# A shallow block changes from a corner to a strip within a small turn of the direction square to a side.
_SKEWS = np.array([-0.05, -0.012, 0.0, 0.012, 0.05])
_SHALLOW = np.array([0.01, 0.03, 0.06, 0.1, 0.15, 0.2, 0.3])
_FEW_SIDES = 16


@dataclass(frozen=True)
class Table:
    """Sampled neutral axes (k,) with scaled strengths.

    Attributes
    ----------
    direction : unit vectors of strength, (3, k)
    level, moment : design axial strength, and unit vectors of moment, (2, k)
    design : length of the design strength
    eps_t : strain of the extreme tension bar
    folds : whether the design axial strength anywhere falls while c grows
    """

    theta: Floats
    c: Floats
    direction: Floats
    level: Floats
    moment: Floats
    design: Floats
    eps_t: Floats
    folds: bool

    def nearest_to_rays(self, along: Floats) -> Indices:
        """Samples nearest in direction to unit vectors (3, n)."""
        return _most_alike(along, self.direction)

    def starts_at_levels(self, rule: Rule, level: Floats, along: Floats) -> list[tuple[Floats, Floats]]:
        """Starts (theta, c) for scaled axial forces (n,) and unit vectors of moment (2, n); one a range of phi."""
        ranges = [np.arange(self.theta.size)]
        if self.folds:
            compressed, tensioned = self.eps_t <= rule.eps_ty, self.eps_t >= rule.eps_tc
            ranges = [np.flatnonzero(part) for part in (compressed, tensioned, ~compressed & ~tensioned) if part.any()]
        nearest = [self._nearest_to_levels(level, along, among) for among in ranges]
        return [(self.theta[start], self.c[start]) for start in nearest]

    def _nearest_to_levels(self, level: Floats, along: Floats, among: Indices) -> Indices:
        # Of 10 (difference of levels)^2 less the product of the unit vectors, without what no sample changes.
        wanted = np.concatenate([along, [20 * level, np.full(level.shape, -10.0)]])
        samples = np.concatenate([self.moment, [self.level, self.level**2]])[:, among]
        return among[_most_alike(wanted, samples)]


def _most_alike(wanted: Floats, samples: Floats) -> Indices:
    """For each column of one array the column of the other with the largest product."""
    # Not a matrix product: libraries spread those over threads, and what a run computes must not hang on their number.
    rows = np.ascontiguousarray(wanted.T.astype(np.float32))
    nearest: Indices = np.einsum("ni,ik->nk", rows, samples.astype(np.float32)).argmax(axis=1)
    return nearest


def _neutral_axes(section: Section) -> tuple[Floats, Floats]:
    """Directions, and depths over the depth of the section, (k,)."""
    grids = [np.meshgrid(THETAS, _DEPTHS)]
    if section.diameter is None and len(section.edges[0]) <= _FEW_SIDES:
        side = section.edges[1] - section.edges[0]
        square = np.arctan2(-side[:, 0], side[:, 1])
        grids.append(np.meshgrid((square + _SKEWS[:, None]).ravel(), _SHALLOW))
    return np.concatenate([grid[0].ravel() for grid in grids]), np.concatenate([grid[1].ravel() for grid in grids])


def sample(section: Section, rule: Rule) -> Table:
    """The table of a section; samples where every bar has yielded in compression tell nothing and are left out."""
    theta, depth = _neutral_axes(section)
    seen = frame(section, theta)
    cut = cut_section(section, seen, depth * seen.depth)
    telling = -cut.eps_t < 0.95 * section.f_y / section.E_s
    scaled = cut.forces / scale_of(section)
    phi, length, moment = rule.phi(cut.eps_t), np.linalg.norm(scaled, axis=0), np.hypot(*scaled[1:])
    telling &= moment > 1e-9
    direction, bending = scaled / length, scaled[1:] / np.maximum(moment, 1e-9)
    level = phi * scaled[0]
    return Table(
        theta=theta[telling],
        c=cut.c[telling],
        direction=direction[:, telling],
        level=level[telling],
        moment=bending[:, telling],
        design=(phi * length)[telling],
        eps_t=cut.eps_t[telling],
        folds=_folds(theta, cut.c, level),
    )


def _folds(theta: Floats, c: Floats, level: Floats) -> bool:
    order = np.lexsort((c, theta))
    falls = np.diff(level[order]) < -1e-6
    return bool((falls & (np.diff(theta[order]) == 0)).any())
