"""Development of headed bars in tension, ACI 318 25.4.4: normalweight concrete, No. 11 and smaller."""

from __future__ import annotations

from math import sqrt

from calcpack.aci318.limits import BAR_DIAMETER_TO_NO_11, CONCRETE, YIELD_60, YIELD_100, YIELD_LEAST
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import formula, inch, psi
from calcpack.units import Length, Ratio, Stress

__all__ = ["head_14", "head_19", "head_cover_minimum", "head_minimum", "head_spacing_14", "head_spacing_19"]


@formula(ACI_318_14("25.4.4.2(a)"), empirical=True, limits=(CONCRETE, YIELD_LEAST, YIELD_60, BAR_DIAMETER_TO_NO_11))
def head_14(*, f_y: Stress, f_c: Stress, psi_e: Ratio, d_b: Length) -> Length:
    """Development length of a headed bar by the equation, before its minima, concrete counted up to 6,000 psi."""
    root_f_c = sqrt(min(f_c, 6000 * psi))
    l_dt_a = 0.016 * f_y * psi_e / root_f_c * d_b
    return l_dt_a


@formula(ACI_318_19("25.4.4.2(a)"), empirical=True, limits=(CONCRETE, YIELD_LEAST, YIELD_100, BAR_DIAMETER_TO_NO_11))
def head_19(*, f_y: Stress, f_c: Stress, psi_e: Ratio, psi_p: Ratio, psi_o: Ratio, psi_c: Ratio, d_b: Length) -> Length:
    """Development length of a headed bar by the equation, before its minima."""
    root_f_c = min(sqrt(f_c), 100.0)
    l_dt_a: Length = f_y * psi_e * psi_p * psi_o * psi_c / (75 * root_f_c) * d_b**1.5
    return l_dt_a


@formula(ACI_318_14("25.4.4.2"), ACI_318_19("25.4.4.2"))
def head_minimum(*, l_dt_a: Length, d_b: Length) -> Length:
    """Development length of a headed bar, not less than 8 bar diameters and 6 in."""
    l_dt = max(l_dt_a, 8 * d_b, 6 * inch)
    return l_dt


@formula(ACI_318_14("25.4.4.1"), ACI_318_19("25.4.4.1"))
def head_cover_minimum(*, d_b: Length) -> Length:
    """Least clear cover of a headed bar."""
    c_c_min = 2 * d_b
    return c_c_min


# 318-14 asks for 4 d_b clear; the schedule, and 318-19, measure from centre to centre.
@formula(ACI_318_14("25.4.4.1"))
def head_spacing_14(*, d_b: Length) -> Length:
    """Least centre-to-centre spacing of headed bars, 4 bar diameters clear."""
    s_min = 5 * d_b
    return s_min


@formula(ACI_318_19("25.4.4.1"))
def head_spacing_19(*, d_b: Length) -> Length:
    """Least centre-to-centre spacing of headed bars."""
    s_min = 3 * d_b
    return s_min
