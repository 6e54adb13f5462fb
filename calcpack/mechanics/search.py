"""Neutral axes for many load points at once: Newton's method on the exact equations, bracketing where it fails."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from calcpack.mechanics.block import frame
from calcpack.mechanics.outlines import Bools, Floats
from calcpack.mechanics.section import Section
from calcpack.mechanics.strength import Cut, cut_section
from calcpack.mechanics.targets import Indices, Target

__all__ = ["Found", "newton"]

_CLOSE = 1e-10
_STEPS = 9
_TURN = 0.4


@dataclass(frozen=True)
class Found:
    """Neutral axes (n,), and which of them satisfy the equations, on the side of the load."""

    theta: Floats
    c: Floats
    strength: Floats
    holds: Bools

    @classmethod
    def nothing(cls, count: int) -> Found:
        """Nothing found yet for so many loads."""
        theta, c, strength = np.full((3, count), np.nan)
        return cls(theta, c, strength, np.zeros(count, dtype=bool))

    def part(self, which: slice) -> Found:
        """Some of them."""
        return Found(self.theta[which], self.c[which], self.strength[which], self.holds[which])


def newton(
    section: Section, target: Target, which: Indices, theta: Floats, c: Floats, in_block: Bools | None = None
) -> Found:
    """Neutral axes for the loads of index `which`, from starts (n,); `in_block` holds bars (bars, n) on their side."""
    theta, c = theta.copy(), c.copy()
    strength = np.full(theta.shape, np.nan)
    active = np.arange(theta.size)
    for _ in range(_STEPS):
        inside = None if in_block is None else in_block[:, active]
        cut = cut_section(section, frame(section, theta[active]), c[active], inside)
        linear = target.equations(cut, which[active])
        worst: Floats = np.abs(linear.error).max(axis=0)
        close = worst < _CLOSE
        true = close if inside is None else close & (inside == cut.passed).all(axis=0)
        strength[active[true]] = target.strength(cut, which[active])[true]
        on = np.logical_not(close)
        if not on.any():
            break
        turn, move = _step(linear.error[:, on], linear.turn[:, on], linear.move[:, on])
        active = active[on]
        theta[active] += turn
        c[active] = _moved(section, cut, on, theta[active], move)
    return Found(theta, c, strength, strength > 0)


def _step(error: Floats, turn: Floats, move: Floats) -> tuple[Floats, Floats]:
    """Newton's step of theta and of q, no further than theta may turn at once."""
    determinant = turn[0] * move[1] - turn[1] * move[0]
    determinant = np.where(determinant == 0, np.inf, determinant)
    d_theta = (error[1] * move[0] - error[0] * move[1]) / determinant
    d_q = (error[0] * turn[1] - error[1] * turn[0]) / determinant
    share = np.minimum(1.0, _TURN / np.maximum(np.abs(d_theta), _TURN))
    return share * d_theta, share * d_q


def _moved(section: Section, cut: Cut, on: Bools, theta: Floats, move: Floats) -> Floats:
    """Depths c after the block's edge moved: q is stepped, since it runs smoothly where the extreme vertex changes."""
    before = cut.c[on]
    q = cut.seen.h[on] - section.beta_1 * before + move
    return np.clip((frame(section, theta).h - q) / section.beta_1, before / 4, before * 4)
