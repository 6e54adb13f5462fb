"""Neutral axes by bracketing, for the few load points from which Newton's method does not arrive.

For every direction theta there is a depth c at which the strength has the load's axial force or elevation; once around,
its moment then turns once around. Nested sections of both intervals come as near as Newton's method needs.
"""

from __future__ import annotations

import numpy as np

from calcpack.mechanics.block import frame
from calcpack.mechanics.outlines import Floats
from calcpack.mechanics.search import Found, newton
from calcpack.mechanics.section import Section
from calcpack.mechanics.strength import cut_section
from calcpack.mechanics.table import THETAS
from calcpack.mechanics.targets import Indices, Target

__all__ = ["bracketed"]

_PARTS = 8
_DEPTH_PASSES = 16
_THETA_PASSES = 14
_SMALLEST = 1e-9
_AT_ONCE = 16


def bracketed(section: Section, target: Target, which: Indices) -> Found:
    """Neutral axes for the loads of index `which`."""
    parts = [_bracketed(section, target, which[i : i + _AT_ONCE]) for i in range(0, which.size, _AT_ONCE)]
    names = ("theta", "c", "strength", "holds")
    return Found(*(np.concatenate([getattr(part, name) for part in parts]) for name in names))


def _bracketed(section: Section, target: Target, which: Indices) -> Found:
    count = which.size
    found = Found.nothing(count)
    low, high = np.full(count, THETAS[0]), np.full(count, THETAS[0] + 2 * np.pi)
    parts = THETAS.size
    open_ = np.arange(count)
    for _ in range(_THETA_PASSES):
        theta = low[open_] + np.linspace(0, 1, parts + 1)[:, None] * (high - low)[open_]
        c = _depths(section, target, which[open_], theta)
        left = _turning(section, target, which[open_], theta, c)
        lines = np.arange(open_.size)
        low[open_], high[open_] = theta[left, lines], theta[left + 1, lines]
        for end in (left, left + 1):
            polished = newton(section, target, which[open_], theta[end, lines], c[end, lines])
            _take(found, polished, open_)
        open_ = np.flatnonzero(~found.holds)
        if not open_.size:
            break
        parts = _PARTS
    return found


def _take(found: Found, polished: Found, open_: Indices) -> None:
    """Keep what holds; the smaller strength where both ends hold."""
    better = polished.holds & ~(found.holds[open_] & (found.strength[open_] <= polished.strength))
    for name in ("theta", "c", "strength", "holds"):
        getattr(found, name)[open_[better]] = getattr(polished, name)[better]


def _depths(section: Section, target: Target, which: Indices, theta: Floats) -> Floats:
    """Depths c where `rise` turns positive for good, (m, n), for directions (m, n)."""
    angle, load = theta.ravel(), np.broadcast_to(which, theta.shape).ravel()
    depth = frame(section, angle).depth
    low, high = np.log(_SMALLEST * depth), np.log(_largest(section) * depth)
    steps = np.linspace(0, 1, _PARTS + 1)[:, None]
    lines = np.arange(angle.size)
    for _ in range(_DEPTH_PASSES):
        c = low + steps * (high - low)
        cut = cut_section(section, frame(section, np.tile(angle, _PARTS - 1)), np.exp(c[1:-1]).ravel())
        rise = target.rise(cut, np.tile(load, _PARTS - 1)).reshape(_PARTS - 1, -1)
        # The last sample below the load: on a surface that folds, the branch of larger c bounds the design region.
        left = ((rise < 0) * np.arange(1, _PARTS)[:, None]).max(axis=0)
        low, high = c[left, lines], c[left + 1, lines]
    middle: Floats = np.exp((low + high) / 2).reshape(theta.shape)
    return middle


def _largest(section: Section) -> float:
    """The depth c beyond which nothing changes, over the depth of the section."""
    elastic = 1 - section.f_y / section.E_s / section.eps_cu
    return 1.01 / elastic if elastic > 1e-6 else 1e6


def _turning(section: Section, target: Target, which: Indices, theta: Floats, c: Floats) -> Indices:
    """The interval of theta (n,) in which the moment passes the load's."""
    cut = cut_section(section, frame(section, theta.ravel()), c.ravel())
    swing = target.swing(cut, np.broadcast_to(which, theta.shape).ravel()).reshape(theta.shape)
    before, after = swing[:-1], swing[1:]
    passes = (before <= 0) & (after > 0) & (after - before < np.pi)
    steepest: Indices = np.where(passes, np.pi - np.abs(before) - np.abs(after), -np.inf).argmax(axis=0)
    return steepest
