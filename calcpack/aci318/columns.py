"""Axial strength of columns, ACI 318 22.4.2, and limits of their longitudinal bars, 10.6, 10.7 and 25.2."""

from __future__ import annotations

from math import pi, sin

from calcpack.aci318.limits import CONCRETE, YIELD_LEAST
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, Limit, formula, inch, psi
from calcpack.units import Area, Count, Force, Length, Ratio, Stress

__all__ = [
    "area_circular",
    "area_of_bars",
    "area_rectangular",
    "axial_strength",
    "axial_strength_high_grade",
    "axial_strength_maximum_spiral",
    "axial_strength_maximum_tied",
    "bar_circle",
    "bar_pitch_circular",
    "bar_pitch_face",
    "bar_pitch_side",
    "bar_spacing_circular",
    "bar_spacing_face",
    "bar_spacing_minimum",
    "bar_spacing_minimum_aggregate",
    "bar_spacing_side",
    "bars_minimum_spiral",
    "bars_minimum_tied",
    "design_axial_strength",
    "least_dimension_circular",
    "least_dimension_rectangular",
    "outermost_bar_x",
    "outermost_bar_y",
    "phi_spiral",
    "phi_tied",
    "reinforcement_ratio",
    "reinforcement_ratio_maximum",
    "reinforcement_ratio_minimum",
    "yield_in_axial_strength",
]

_PHI = (ACI_318_14("Table 21.2.2"), ACI_318_19("Table 21.2.2"))
_P_N_MAX = (ACI_318_14("Table 22.4.2.1"), ACI_318_19("Table 22.4.2.1"))
_SPACING = (ACI_318_14("25.2.3"), ACI_318_19("25.2.3"))
_BARS = (ACI_318_14("10.7.3.1"), ACI_318_19("10.7.3.1"))
_RATIO = (ACI_318_14("10.6.1.1"), ACI_318_19("10.6.1.1"))
_GEOMETRY = Clause("geometry of the section")
_YIELD_SOURCE = "ACI 318-14 Table 20.2.2.4a, 318-19 22.4.2.1"
_YIELD_80 = Limit("f_y", _YIELD_SOURCE, high=80_000)
_YIELD_AXIAL = Limit("f_y_axial", _YIELD_SOURCE, low=40_000, high=80_000)


@formula(_GEOMETRY)
def area_rectangular(*, b: Length, h: Length) -> Area:
    """Gross area of a rectangular section."""
    A_g = b * h
    return A_g


@formula(_GEOMETRY)
def area_circular(*, h: Length) -> Area:
    """Gross area of a circular section."""
    A_g = pi / 4 * h**2
    return A_g


@formula(_GEOMETRY)
def least_dimension_rectangular(*, b: Length, h: Length) -> Length:
    """Least dimension of a rectangular column."""
    h_min = min(b, h)
    return h_min


@formula(_GEOMETRY)
def least_dimension_circular(*, h: Length) -> Length:
    """Least dimension of a circular column."""
    h_min = h
    return h_min


@formula(_GEOMETRY)
def area_of_bars(*, n_bars: Count, A_b: Area) -> Area:
    """Total area of longitudinal bars, from the nominal area of one."""
    A_st = n_bars * A_b
    return A_st


@formula(ACI_318_19("22.4.2.1"))
def yield_in_axial_strength(*, f_y: Stress) -> Stress:
    """Yield strength that counts in the axial strength."""
    f_y_axial = min(f_y, 80000 * psi)
    return f_y_axial


@formula(ACI_318_14("22.4.2.2"), ACI_318_19("22.4.2.2"), limits=(CONCRETE, YIELD_LEAST, _YIELD_80))
def axial_strength(*, f_c: Stress, A_g: Area, A_st: Area, f_y: Stress) -> Force:
    """Nominal axial strength at zero eccentricity.

    >>> axial_strength(f_c=5_000.0, A_g=324.0, A_st=7.2, f_y=66_000.0)
    1821600.0
    """
    P_o = 0.85 * f_c * (A_g - A_st) + f_y * A_st
    return P_o


@formula(ACI_318_19("22.4.2.2"), limits=(CONCRETE, _YIELD_AXIAL))
def axial_strength_high_grade(*, f_c: Stress, A_g: Area, A_st: Area, f_y_axial: Stress) -> Force:
    """Nominal axial strength at zero eccentricity, bars above Grade 80."""
    P_o = 0.85 * f_c * (A_g - A_st) + f_y_axial * A_st
    return P_o


@formula(*_P_N_MAX)
def axial_strength_maximum_tied(*, P_o: Force) -> Force:
    """Maximum nominal axial strength of a tied column."""
    P_n_max = 0.80 * P_o
    return P_n_max


@formula(*_P_N_MAX)
def axial_strength_maximum_spiral(*, P_o: Force) -> Force:
    """Maximum nominal axial strength of a spiral column."""
    P_n_max = 0.85 * P_o
    return P_n_max


@formula(*_PHI)
def phi_tied() -> Ratio:
    """Strength reduction factor of a compression-controlled tied column."""
    phi = 0.65
    return phi


@formula(*_PHI)
def phi_spiral() -> Ratio:
    """Strength reduction factor of a compression-controlled spiral column."""
    phi = 0.75
    return phi


@formula(ACI_318_14("10.5.1.1"), ACI_318_19("10.5.1.1"))
def design_axial_strength(*, phi: Ratio, P_n_max: Force) -> Force:
    """Maximum design axial strength."""
    phi_P_n_max = phi * P_n_max
    return phi_P_n_max


@formula(*_RATIO)
def reinforcement_ratio(*, A_st: Area, A_g: Area) -> Ratio:
    """Ratio of longitudinal reinforcement to gross area."""
    rho_g = A_st / A_g
    return rho_g


@formula(*_RATIO)
def reinforcement_ratio_minimum() -> Ratio:
    """Least ratio of longitudinal reinforcement."""
    rho_g_min = 0.01
    return rho_g_min


@formula(*_RATIO)
def reinforcement_ratio_maximum() -> Ratio:
    """Largest ratio of longitudinal reinforcement."""
    rho_g_max = 0.08
    return rho_g_max


@formula(*_BARS)
def bars_minimum_tied() -> Count:
    """Least number of bars within rectangular or circular ties."""
    n_min = 4.0
    return n_min


@formula(*_BARS)
def bars_minimum_spiral() -> Count:
    """Least number of bars within a spiral."""
    n_min = 6.0
    return n_min


@formula(_GEOMETRY)
def bar_spacing_face(*, b: Length, c_cover: Length, d_bt: Length, n_face: Count, d_b: Length) -> Length:
    """Clear spacing of bars along a face of width b."""
    s_clear = (b - 2 * (c_cover + d_bt) - n_face * d_b) / (n_face - 1)
    return s_clear


@formula(_GEOMETRY)
def bar_spacing_side(*, h: Length, c_cover: Length, d_bt: Length, n_face: Count, d_b: Length) -> Length:
    """Clear spacing of bars along a face of depth h."""
    s_clear = (h - 2 * (c_cover + d_bt) - n_face * d_b) / (n_face - 1)
    return s_clear


@formula(_GEOMETRY)
def bar_pitch_face(*, b: Length, c_cover: Length, d_bt: Length, n_face: Count, d_b: Length) -> Length:
    """Centre-to-centre spacing of bars along a face of width b."""
    s = (b - 2 * (c_cover + d_bt) - d_b) / (n_face - 1)
    return s


@formula(_GEOMETRY)
def bar_pitch_side(*, h: Length, c_cover: Length, d_bt: Length, n_face: Count, d_b: Length) -> Length:
    """Centre-to-centre spacing of bars along a face of depth h."""
    s = (h - 2 * (c_cover + d_bt) - d_b) / (n_face - 1)
    return s


@formula(_GEOMETRY)
def bar_circle(*, h: Length, c_cover: Length, d_bt: Length, d_b: Length) -> Length:
    """Diameter of the circle through the bar centres of a circular column."""
    D_s = h - 2 * (c_cover + d_bt) - d_b
    return D_s


@formula(_GEOMETRY)
def outermost_bar_x(*, b: Length, c_cover: Length, d_bt: Length, d_b: Length) -> Length:
    """Distance of the outermost bar centres from the centroid, along x."""
    x_o = b / 2 - (c_cover + d_bt + d_b / 2)
    return x_o


@formula(_GEOMETRY)
def outermost_bar_y(*, h: Length, c_cover: Length, d_bt: Length, d_b: Length) -> Length:
    """Distance of the outermost bar centres from the centroid, along y."""
    y_o = h / 2 - (c_cover + d_bt + d_b / 2)
    return y_o


@formula(_GEOMETRY)
def bar_spacing_circular(*, D_s: Length, n_bars: Count, d_b: Length) -> Length:
    """Clear spacing of bars on a circle, along the chord."""
    s_clear = D_s * sin(pi / n_bars) - d_b
    return s_clear


@formula(_GEOMETRY)
def bar_pitch_circular(*, D_s: Length, n_bars: Count) -> Length:
    """Centre-to-centre spacing of bars on a circle, along the chord."""
    s = D_s * sin(pi / n_bars)
    return s


@formula(*_SPACING)
def bar_spacing_minimum(*, d_b: Length) -> Length:
    """Least clear spacing of longitudinal bars, the aggregate not stated."""
    s_clear_min = max(1.5 * inch, 1.5 * d_b)
    return s_clear_min


@formula(*_SPACING)
def bar_spacing_minimum_aggregate(*, d_b: Length, d_agg: Length) -> Length:
    """Least clear spacing of longitudinal bars."""
    s_clear_min = max(1.5 * inch, 1.5 * d_b, 4 / 3 * d_agg)
    return s_clear_min
