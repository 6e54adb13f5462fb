"""Nominal strength of a section at a neutral axis: plane sections, equivalent block, elastic-plastic bars.

Signs: compression and its strains are positive. Positive Mx (about x, so the size along y is its depth) compresses the
face at +y, positive My the face at +x: Mx is the sum of force times y, My the sum of force times x. A neutral axis is
given by the direction theta that points towards the compressed face, counterclockwise from +x, and its depth c from the
extreme compression fibre; theta = pi/2 is positive Mx alone in a section symmetric about y.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import ArrayLike

from calcpack.errors import Problem, RangeError
from calcpack.mechanics.block import Block, Frame, block, frame
from calcpack.mechanics.outlines import Bools, Floats
from calcpack.mechanics.section import Section

__all__ = ["BarStates", "Cut", "Nominal", "bar_states", "cut_section", "nominal"]


@dataclass(frozen=True)
class Nominal:
    """Nominal strength at neutral axes (theta, c), lb and lb*in; eps_t is the strain of the extreme tension bar."""

    theta: Floats
    c: Floats
    P: Floats
    Mx: Floats
    My: Floats
    eps_t: Floats


@dataclass(frozen=True)
class BarStates:
    """Bars (one row each) at neutral axes (one column each), as a hand tabulates them.

    Attributes
    ----------
    d : depth from the extreme compression fibre, in
    strain, stress : compression positive, psi
    in_block : whether the centre lies inside the block
    force : lb, displaced concrete deducted
    """

    d: Floats
    strain: Floats
    stress: Floats
    in_block: Bools
    force: Floats


@dataclass(frozen=True)
class Cut:
    """A section cut by neutral axes: what strength and its derivatives are made of."""

    section: Section
    seen: Frame
    c: Floats
    q: Floats
    block: Block
    bars: BarStates

    @property
    def passed(self) -> Bools:
        """Bars whose centre the edge of the block has passed."""
        passed: Bools = self.bars.d < self.section.beta_1 * self.c
        return passed

    @cached_property
    def forces(self) -> Floats:
        """P, Mx, My: (3, n)."""
        section, seen, cut, bars = self.section, self.seen, self.block, self.bars
        f = 0.85 * section.f_c
        Mx = cut.S_u * seen.n_y + cut.S_v * seen.n_x
        My = cut.S_u * seen.n_x - cut.S_v * seen.n_y
        return f * np.stack([cut.area, Mx, My]) + _resultants(section, bars.force)

    @cached_property
    def eps_t(self) -> Floats:
        """Strain of the extreme tension bar, tension positive."""
        eps_t: Floats = -self.bars.strain.min(axis=0)
        return eps_t

    @cached_property
    def slopes(self) -> tuple[Floats, Floats]:
        """Change of P, Mx, My as the block's edge turns (d theta) and moves towards the face (d q), (3, n) each."""
        turn, move = self._bar_slopes
        seen, cut, f = self.seen, self.block, 0.85 * self.section.f_c
        n_x, n_y, q = seen.n_x, seen.n_y, self.q
        turned_u, turned_v = q * cut.chord_v, cut.chord_vv
        moved_u, moved_v = q * cut.chord, cut.chord_v
        turned = np.stack([cut.chord_v, turned_u * n_y + turned_v * n_x, turned_u * n_x - turned_v * n_y])
        moved = np.stack([cut.chord, moved_u * n_y + moved_v * n_x, moved_u * n_x - moved_v * n_y])
        return f * turned + turn, move - f * moved

    @cached_property
    def eps_t_slopes(self) -> tuple[Floats, Floats]:
        """Change of eps_t with theta and with q."""
        lines = np.arange(self.c.size)
        extreme = self.bars.strain.argmin(axis=0)
        turn, move = self._strain_slopes
        return -turn[extreme, lines], -move[extreme, lines]

    @cached_property
    def _strain_slopes(self) -> tuple[Floats, Floats]:
        section, seen, c = self.section, self.seen, self.c
        v = section.y[:, None] * seen.n_x - section.x[:, None] * seen.n_y
        # c = (h - q)/beta_1, and h changes with theta as well.
        stretch = section.eps_cu * self.bars.d / (c * c * section.beta_1)
        return section.eps_cu / c * (v - seen.h_slope) + stretch * seen.h_slope, -stretch

    @cached_property
    def _bar_slopes(self) -> tuple[Floats, Floats]:
        section = self.section
        elastic = np.abs(self.bars.stress) < section.f_y
        stiffness = np.where(elastic, section.E_s * section.A_b[:, None], 0.0)
        turn, move = self._strain_slopes
        return _resultants(section, stiffness * turn), _resultants(section, stiffness * move)


def _resultants(section: Section, force: Floats) -> Floats:
    # Sums and not matrix products, whose last digits depend on how a library splits them.
    x, y = section.x[:, None], section.y[:, None]
    return np.stack([force.sum(axis=0), (y * force).sum(axis=0), (x * force).sum(axis=0)])


def cut_section(section: Section, seen: Frame, c: Floats, in_block: Bools | None = None) -> Cut:
    """The section cut at depths c (n,) of neutral axes seen along directions (n,); c may be infinite.

    `in_block` (bars, n) states which bars displace concrete; by default those whose centre lies inside the block.
    """
    # A block deeper than the section is the section.
    q = seen.h - np.minimum(section.beta_1 * c, 1.5 * seen.depth)
    return Cut(section, seen, c, q, block(section, seen, q), _bars(section, seen, c, in_block))


def _bars(section: Section, seen: Frame, c: Floats, in_block: Bools | None) -> BarStates:
    d = seen.h - (section.x[:, None] * seen.n_x + section.y[:, None] * seen.n_y)
    with np.errstate(divide="ignore"):
        strain = section.eps_cu * (1 - d / c)
    stress = np.clip(section.E_s * strain, -section.f_y, section.f_y)
    in_block = d < section.beta_1 * c if in_block is None else in_block
    force = section.A_b[:, None] * (stress - 0.85 * section.f_c * in_block)
    return BarStates(d, strain, stress, in_block, force)


def nominal(section: Section, theta: ArrayLike, c: ArrayLike) -> Nominal:
    """Nominal strength at neutral axes: direction theta, rad, and depth c, in; scalars or arrays of one shape.

    c = 0 is pure tension, c = inf pure compression.

    Raises
    ------
    RangeError : a negative depth, or NaN
    """
    angle, depth = _lines(theta, c)
    cut = cut_section(section, frame(section, angle), depth)
    P, Mx, My = cut.forces
    return Nominal(angle, depth, P, Mx, My, cut.eps_t)


def bar_states(section: Section, theta: ArrayLike, c: ArrayLike) -> BarStates:
    """Depths, strains, stresses and forces of the bars at neutral axes; arguments as in `nominal`."""
    angle, depth = _lines(theta, c)
    return cut_section(section, frame(section, angle), depth).bars


def _lines(theta: ArrayLike, c: ArrayLike) -> tuple[Floats, Floats]:
    angle, depth = np.broadcast_arrays(np.atleast_1d(np.array(theta, float)), np.atleast_1d(np.array(c, float)))
    wrong = np.flatnonzero(~((depth >= 0) & np.isfinite(angle)))
    if wrong.size:
        problems = [Problem(f"theta = {angle[i]:g}, c = {depth[i]:g} in", "c from 0 to infinity") for i in wrong]
        raise RangeError("neutral axis", problems)
    return angle, depth
