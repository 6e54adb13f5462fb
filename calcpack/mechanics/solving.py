"""The neutral axis that governs each load point: from the table's start to the smallest strength there is.

Two things let a load have more than one: a bar that enters the block displaces concrete at once, so that the surface
overlaps itself by that much; and phi may rise faster than the axial strength falls, so that a level of axial force is
met three times. The smallest strength, where the load first leaves the design region, counts.
"""

from __future__ import annotations

import numpy as np

from calcpack.mechanics.block import frame
from calcpack.mechanics.bracketing import bracketed
from calcpack.mechanics.outlines import Bools, Floats
from calcpack.mechanics.search import Found, newton
from calcpack.mechanics.section import Section
from calcpack.mechanics.strength import Cut, cut_section
from calcpack.mechanics.targets import Indices, Target

__all__ = ["governing"]

_WINDOW = 4.0
_ROWS = 2
_ONE_ROW = 1e-6


def governing(section: Section, target: Target, starts: list[tuple[Floats, Floats]], needed: Bools) -> Found:
    """Neutral axes (n,) of the smallest strength found from every start (theta, c); where none holds, NaN.

    Bracketing, which is slow, is spent on loads that are `needed`.
    """
    every = np.arange(needed.size)
    found = Found.nothing(needed.size)
    if not needed.size:
        return found
    for theta, c in starts:
        _keep_smaller(found, newton(section, target, every, theta, c), every)
    lost = np.flatnonzero(~found.holds & needed)
    if lost.size:
        _keep_smaller(found, bracketed(section, target, lost), lost)
    _try_neighbours(section, target, found)
    return found


def _keep_smaller(found: Found, other: Found, which: Indices) -> None:
    smaller = other.holds & ~(found.strength[which] <= other.strength)
    for name in ("theta", "c", "strength", "holds"):
        getattr(found, name)[which[smaller]] = getattr(other, name)[smaller]


def _try_neighbours(section: Section, target: Target, found: Found) -> None:
    """Search again with bars on the other side of the block's edge, where it passes them closely.

    The set of bars inside the block is held while the search runs, and has to be true of what it finds.
    """
    held = np.flatnonzero(found.holds)
    cut = cut_section(section, frame(section, found.theta[held]), found.c[held])
    beyond = cut.bars.d - section.beta_1 * cut.c
    lines, shift = _shifts(section, cut, beyond)
    which = held[lines]
    if which.size:
        others = newton(section, target, which, found.theta[which], found.c[which], beyond[:, lines] < shift)
        for first in range(which.size):
            _keep_smaller(found, others.part(slice(first, first + 1)), which[first : first + 1])


def _shifts(section: Section, cut: Cut, beyond: Floats) -> tuple[Indices, Floats]:
    """By how much the edge has to move to take in, or leave out, one and two more rows of bars; and for which line."""
    chord = np.maximum(cut.block.chord, 1e-9 * cut.seen.depth)
    near = np.abs(beyond) < _WINDOW * section.A_st / chord
    # A bar shifts the edge by its area over the chord; those within reach shift it together.
    reach = np.where(cut.block.chord > 0, _WINDOW * (section.A_b[:, None] * near).sum(axis=0) / chord, 0.0)
    lines, shifts = [], []
    for sign in (1.0, -1.0):
        apart = np.where(sign * beyond >= 0, sign * beyond, np.inf)
        for _ in range(_ROWS):
            row = apart.min(axis=0) + _ONE_ROW
            lines.append(np.flatnonzero(row < reach))
            shifts.append(sign * row[lines[-1]])
            apart = np.where(apart <= row, np.inf, apart)
    return np.concatenate(lines), np.concatenate(shifts)
