"""Dowels from a column or pedestal into its foundation, ACI 318 16.3.4 and 16.3.5."""

from __future__ import annotations

from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, formula
from calcpack.units import Area, Count

__all__ = ["dowel_area", "dowel_area_minimum"]


@formula(Clause("geometry of the section"))
def dowel_area(*, n_bars: Count, A_b: Area) -> Area:
    """Area of the bars across the joint."""
    A_s = n_bars * A_b
    return A_s


@formula(ACI_318_14("16.3.4.1"), ACI_318_19("16.3.4.1"))
def dowel_area_minimum(*, A_g: Area) -> Area:
    """Least area across the joint of a column or pedestal that is cast in place on its foundation.

    >>> round(dowel_area_minimum(A_g=196.0), 3)
    0.98
    """
    A_s_min = 0.005 * A_g
    return A_s_min
