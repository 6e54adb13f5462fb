"""Bars of a column section: where the layouts of a schedule put them. Lengths in inches, x along b, y along h."""

from __future__ import annotations

import math
from typing import NamedTuple

from calcpack.figures.trade import Refusal

__all__ = ["Bar", "circular_bars", "rectangular_bars"]


class Bar(NamedTuple):
    """A bar of a section: its centre from the centre of the section, and its diameter, inches."""

    x: float
    y: float
    d_b: float


def _spread(count: int, half: float) -> list[float]:
    return [half * (2 * i / (count - 1) - 1) for i in range(count)]


def rectangular_bars(
    *, b: float, h: float, cover: float, tie_d: float, d_b: float, n_x: int, n_y: int
) -> tuple[Bar, ...]:
    """Bars evenly spaced inside the ties of a rectangle.

    Parameters
    ----------
    b, h : sides along x and y, inches
    cover : clear, to the tie, inches
    tie_d, d_b : diameters of tie and bar, inches
    n_x : bars along each face parallel to x, corners counted
    n_y : bars along each face parallel to y, corners counted

    Raises
    ------
    RangeError : a length that is not positive, fewer than 2 bars a face, or no room inside the ties
    """
    refusal = Refusal("the bar layout")
    refusal.positive(b=b, h=h, cover=cover, tie_d=tie_d, d_b=d_b)
    refusal.unless(n_x >= 2, f"n_x = {n_x}", "2 bars or more along a face (its corners)", "correct the layout")
    refusal.unless(n_y >= 2, f"n_y = {n_y}", "2 bars or more along a face (its corners)", "correct the layout")
    inset = cover + tie_d + d_b / 2
    x, y = b / 2 - inset, h / 2 - inset
    room = min(x, y) >= d_b / 2
    refusal.unless(room, f"cover, tie and bar take {2 * inset + d_b:g} in", f"b = {b:g} in, h = {h:g} in", "enlarge it")
    refusal.settle()
    across = [Bar(place, side * y, d_b) for side in (-1, 1) for place in _spread(n_x, x)]
    up = [Bar(side * x, place, d_b) for side in (-1, 1) for place in _spread(n_y, y)[1:-1]]
    return tuple(across + up)


def circular_bars(*, h: float, cover: float, tie_d: float, d_b: float, count: int) -> tuple[Bar, ...]:
    """Bars evenly spaced on a circle, the first on the +x axis.

    Parameters
    ----------
    h : diameter of the section, inches
    cover : clear, to the spiral or tie, inches
    tie_d, d_b : diameters of spiral and bar, inches
    count : number of bars

    Raises
    ------
    RangeError : a length that is not positive, fewer than 3 bars, or no room inside the spiral
    """
    refusal = Refusal("the bar layout")
    refusal.positive(h=h, cover=cover, tie_d=tie_d, d_b=d_b)
    refusal.unless(count >= 3, f"count = {count}", "3 bars or more on a circle", "correct the layout")
    radius = h / 2 - cover - tie_d - d_b / 2
    refusal.unless(
        radius >= d_b / 2, f"radius of the bar circle = {radius:g} in", f"{d_b / 2:g} in or more", "enlarge h"
    )
    refusal.settle()
    angles = (2 * math.pi * i / count for i in range(count))
    return tuple(Bar(radius * math.cos(angle), radius * math.sin(angle), d_b) for angle in angles)
