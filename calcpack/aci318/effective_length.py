"""Effective length factors from the end restraint of a column: the roots of the alignment-chart equations.

The charts stand in the commentary, ACI 318-14 R6.2.5 and 318-19 R6.2.5.1. `calcpack.aci318.slenderness` holds their
equations as they are printed; here they are multiplied through, so that they have no poles and one sign change.
"""

from __future__ import annotations

from collections.abc import Callable
from math import cos, pi, sin

__all__ = ["effective_length_nonsway", "effective_length_sway"]


def effective_length_nonsway(psi_A: float, psi_B: float) -> float:
    """Factor k of a column braced against sidesway, 0.5 (both ends fixed) to 1.0 (both hinged).

    >>> round(effective_length_nonsway(2.0, 2.0), 4), effective_length_nonsway(0.0, 0.0)
    (0.8553, 0.5)
    """
    product, total = psi_A * psi_B, psi_A + psi_B

    def left(u: float) -> float:
        return product / 4 * u**2 * sin(u) + total / 2 * (sin(u) - u * cos(u)) + 2 * (1 - cos(u)) / u - sin(u)

    return _factor(left, pi, 2 * pi) if total > 0 else 0.5


def effective_length_sway(psi_A: float, psi_B: float) -> float:
    """Factor k of a column free to sway, 1.0 (both ends fixed) and up.

    >>> round(effective_length_sway(2.0, 2.0), 4), effective_length_sway(0.0, 0.0)
    (1.5895, 1.0)
    """
    product, total = psi_A * psi_B, psi_A + psi_B

    def left(u: float) -> float:
        return 6 * total * u * -cos(u) + (product * u**2 - 36) * sin(u)

    return _factor(lambda u: -left(u), 0.0, pi) if total > 0 else 1.0


def _factor(left: Callable[[float], float], low: float, high: float) -> float:
    """Pi over the root of a function that is above zero at `low` and below it at `high`."""
    while low < (middle := (low + high) / 2) < high:
        if left(middle) > 0:
            low = middle
        else:
            high = middle
    # Ten figures are what a printed line can repeat; the chart is read to two.
    return float(f"{pi / middle:.10g}")
