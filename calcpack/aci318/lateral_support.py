"""Longitudinal bars that legs of ties and crossties hold, ACI 318 25.7.2.3, and the spacing of those they hold."""

from __future__ import annotations

from math import ceil, pi, sin

from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import formula
from calcpack.units import Count, Length

__all__ = ["legs_minimum", "support_spacing_circular", "support_spacing_x", "support_spacing_y", "supported_bars"]

_H_X = (ACI_318_14("2.2"), ACI_318_19("2.2"))


# n bars have n - 1 spaces; legs that hold every other bar take two spaces each.
@formula(ACI_318_14("25.7.2.3"), ACI_318_19("25.7.2.3"))
def legs_minimum(*, n_face: Count) -> Count:
    """Least number of legs across a face that hold its corner bars and every other bar between them."""
    n_legs_min = (n_face + 1) / 2
    return n_legs_min


@formula(*_H_X)
def support_spacing_x(*, b: Length, c_cover: Length, d_bt: Length, d_b: Length, n_face: Count, n_legs: Count) -> Length:
    """Largest spacing of the held bars along a face of width b, the legs shared out evenly."""
    h_x = ceil((n_face - 1) / (n_legs - 1)) * (b - 2 * (c_cover + d_bt) - d_b) / (n_face - 1)
    return h_x


@formula(*_H_X)
def support_spacing_y(*, h: Length, c_cover: Length, d_bt: Length, d_b: Length, n_face: Count, n_legs: Count) -> Length:
    """Largest spacing of the held bars along a face of depth h, the legs shared out evenly."""
    h_x = ceil((n_face - 1) / (n_legs - 1)) * (h - 2 * (c_cover + d_bt) - d_b) / (n_face - 1)
    return h_x


@formula(*_H_X)
def support_spacing_circular(*, D_s: Length, n_bars: Count) -> Length:
    """Spacing of the bars on a circle, which a circular hoop or a spiral holds."""
    h_x = D_s * sin(pi / n_bars)
    return h_x


@formula(*_H_X)
def supported_bars(*, n_x: Count, n_legs_y: Count, n_y: Count, n_legs_x: Count) -> Count:
    """Bars around a rectangular core that legs hold; legs parallel to y hold bars along the faces parallel to x."""
    n_l = 2 * (min(n_x, n_legs_y) + min(n_y, n_legs_x)) - 4
    return n_l
