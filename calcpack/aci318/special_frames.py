"""Columns of special moment frames, ACI 318 18.7: dimensions, bars, and confinement near the joints.

`b_c` and `A_ch` are measured to the outside of the hoop. Within the length `l_o` transverse reinforcement confines the
core; outside it, its spacing is limited.
"""

from __future__ import annotations

from calcpack.aci318.limits import CONCRETE
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, Limit, formula, inch, psi
from calcpack.units import Area, Count, Force, Length, Ratio, Stress

__all__ = [
    "axial_force_high",
    "bars_factor",
    "bars_minimum_hoops",
    "concrete_factor",
    "concrete_minimum",
    "confinement_area",
    "confinement_circular",
    "confinement_circular_high",
    "confinement_provided",
    "confinement_rectilinear",
    "confinement_rectilinear_high",
    "confinement_spacing_14",
    "confinement_spacing_19",
    "confinement_spacing_by_bars",
    "core_area_rectangular",
    "core_dimension_x",
    "core_dimension_y",
    "dimension_minimum",
    "dimension_ratio",
    "dimension_ratio_minimum",
    "largest_dimension_circular",
    "largest_dimension_rectangular",
    "length_confined",
    "length_confined_without_height",
    "reinforcement_ratio_maximum_special",
    "spacing_beyond_14",
    "spacing_beyond_19",
    "supported_spacing_maximum",
    "supported_spacing_maximum_high",
    "yield_maximum_14",
    "yield_maximum_19",
]


def _both(number: str) -> tuple[Clause, Clause]:
    return ACI_318_14(number), ACI_318_19(number)


_GEOMETRY = Clause("geometry of the section")
_AREA = _both("Table 18.7.5.4")
_SPACING = _both("18.7.5.3")
_YIELD_HOOPS = Limit("f_yt", "ACI 318-14 and 318-19 Table 20.2.2.4a", low=40_000, high=100_000)
_LIMITS = (CONCRETE, _YIELD_HOOPS)
_COMPRESSION = Limit("P_u", "ACI 318-14 and 318-19 18.7.5.2, the largest compression", low=0)


# Dimensions, materials and longitudinal bars


@formula(_GEOMETRY)
def largest_dimension_rectangular(*, b: Length, h: Length) -> Length:
    """Largest dimension of a rectangular column."""
    h_max = max(b, h)
    return h_max


@formula(_GEOMETRY)
def largest_dimension_circular(*, h: Length) -> Length:
    """Largest dimension of a circular column."""
    h_max = h
    return h_max


@formula(*_both("18.7.2.1"))
def dimension_minimum() -> Length:
    """Least dimension of the section."""
    h_min_least = 12 * inch
    return h_min_least


@formula(*_both("18.7.2.1"))
def dimension_ratio(*, h_min: Length, h_max: Length) -> Ratio:
    """Ratio of the least dimension to the one across it."""
    r_h = h_min / h_max
    return r_h


@formula(*_both("18.7.2.1"))
def dimension_ratio_minimum() -> Ratio:
    """Least ratio of the dimensions."""
    r_h_min = 0.4
    return r_h_min


@formula(*_both("Table 19.2.1.1"))
def concrete_minimum() -> Stress:
    """Least strength of concrete in a special moment frame."""
    f_c_min = 3000 * psi
    return f_c_min


@formula(ACI_318_14("Table 20.2.2.4a"))
def yield_maximum_14() -> Stress:
    """Largest yield strength of longitudinal bars in a special moment frame."""
    f_y_max = 60000 * psi
    return f_y_max


@formula(ACI_318_19("Table 20.2.2.4a"))
def yield_maximum_19() -> Stress:
    """Largest yield strength of longitudinal bars in a special moment frame."""
    f_y_max = 80000 * psi
    return f_y_max


@formula(*_both("18.7.4.1"))
def reinforcement_ratio_maximum_special() -> Ratio:
    """Largest ratio of longitudinal reinforcement in a special moment frame."""
    rho_g_max = 0.06
    return rho_g_max


@formula(*_both("18.7.4.2"))
def bars_minimum_hoops() -> Count:
    """Least number of longitudinal bars within circular hoops."""
    n_min = 6.0
    return n_min


# The confined length, and the spacing of bars and of hoops


@formula(*_both("18.7.5.1"))
def length_confined(*, h_max: Length, l_u: Length) -> Length:
    """Length from each joint face within which confinement is required.

    >>> length_confined(h_max=24.0, l_u=168.0)
    28.0
    """
    l_o = max(h_max, l_u / 6, 18 * inch)
    return l_o


@formula(*_both("18.7.5.1"))
def length_confined_without_height(*, h_max: Length) -> Length:
    """Length within which confinement is required, the clear height of the column not stated."""
    l_o = max(h_max, 18 * inch)
    return l_o


@formula(*_both("18.7.5.2(f)"))
def axial_force_high(*, A_g: Area, f_c: Stress) -> Force:
    """Axial force above which every bar has to be held and confinement depends on the axial force."""
    P_high = 0.3 * A_g * f_c
    return P_high


@formula(*_both("18.7.5.2(e)"))
def supported_spacing_maximum() -> Length:
    """Largest spacing of laterally supported bars."""
    h_x_max = 14 * inch
    return h_x_max


@formula(*_both("18.7.5.2(f)"))
def supported_spacing_maximum_high() -> Length:
    """Largest spacing of laterally supported bars under a high axial force or in concrete above 10,000 psi."""
    h_x_max = 8 * inch
    return h_x_max


@formula(*_SPACING)
def confinement_spacing_by_bars(*, h_x: Length) -> Length:
    """Largest spacing of hoops by the spacing of the bars they hold.

    >>> [round(confinement_spacing_by_bars(h_x=h_x), 3) for h_x in (6.0, 8.0, 12.0, 14.0)]
    [6.0, 6.0, 4.667, 4.0]
    """
    s_o = min(max(4 * inch + (14 * inch - h_x) / 3, 4 * inch), 6 * inch)
    return s_o


@formula(ACI_318_14("18.7.5.3"))
def confinement_spacing_14(*, h_min: Length, d_b: Length, s_o: Length) -> Length:
    """Largest spacing of hoops within l_o."""
    s_max = min(h_min / 4, 6 * d_b, s_o)
    return s_max


# 318-19 names grades 60 and 80; a strength between them takes the factor of Grade 80.
@formula(ACI_318_19("18.7.5.3"))
def confinement_spacing_19(*, h_min: Length, d_b: Length, s_o: Length, f_y: Stress) -> Length:
    """Largest spacing of hoops within l_o, by the grade of the longitudinal bars."""
    if f_y <= 60000 * psi:
        s_max = min(h_min / 4, 6 * d_b, s_o)
    else:
        s_max = min(h_min / 4, 5 * d_b, s_o)
    return s_max


@formula(ACI_318_14("18.7.5.5"))
def spacing_beyond_14(*, d_b: Length) -> Length:
    """Largest spacing of transverse reinforcement outside l_o."""
    s_max = min(6 * d_b, 6 * inch)
    return s_max


@formula(ACI_318_19("18.7.5.5"))
def spacing_beyond_19(*, d_b: Length, f_y: Stress) -> Length:
    """Largest spacing of transverse reinforcement outside l_o, by the grade of the longitudinal bars."""
    if f_y <= 60000 * psi:
        s_max = min(6 * d_b, 6 * inch)
    else:
        s_max = min(5 * d_b, 6 * inch)
    return s_max


# Confinement


@formula(_GEOMETRY)
def core_dimension_x(*, b: Length, c_cover: Length) -> Length:
    """Dimension of the core along x, across legs parallel to y, to the outside of the hoop."""
    b_c = b - 2 * c_cover
    return b_c


@formula(_GEOMETRY)
def core_dimension_y(*, h: Length, c_cover: Length) -> Length:
    """Dimension of the core along y, across legs parallel to x, to the outside of the hoop."""
    b_c = h - 2 * c_cover
    return b_c


@formula(_GEOMETRY)
def core_area_rectangular(*, b: Length, h: Length, c_cover: Length) -> Area:
    """Area of a rectangular core, to the outside of the hoop."""
    A_ch = (b - 2 * c_cover) * (h - 2 * c_cover)
    return A_ch


@formula(*_both("2.2"))
def confinement_area(*, n_legs: Count, A_bt: Area) -> Area:
    """Area of the legs across one dimension of the core."""
    A_sh = n_legs * A_bt
    return A_sh


@formula(*_AREA)
def confinement_provided(*, A_sh: Area, s: Length, b_c: Length) -> Ratio:
    """Area of the legs over spacing times dimension of the core."""
    r_sh = A_sh / (s * b_c)
    return r_sh


@formula(*_both("18.7.5.4"), limits=(CONCRETE,))
def concrete_factor(*, f_c: Stress) -> Ratio:
    """Factor for concrete strength.

    >>> concrete_factor(f_c=10_000.0), concrete_factor(f_c=15_000.0)
    (1.0, 1.2)
    """
    k_f = max(f_c / (25000 * psi) + 0.6, 1.0)
    return k_f


@formula(*_both("18.7.5.4"), limits=(Limit("n_l", "ACI 318-14 and 318-19 18.7.5.4", low=3),))
def bars_factor(*, n_l: Count) -> Ratio:
    """Factor for the number of laterally supported bars."""
    k_n = n_l / (n_l - 2)
    return k_n


@formula(*_AREA, limits=_LIMITS)
def confinement_rectilinear(*, A_g: Area, A_ch: Area, f_c: Stress, f_yt: Stress) -> Ratio:
    """Least A_sh/(s b_c) of rectilinear hoops.

    >>> round(confinement_rectilinear(A_g=576.0, A_ch=441.0, f_c=5_000.0, f_yt=60_000.0), 5)
    0.00765
    """
    r_sh_a = 0.3 * (A_g / A_ch - 1) * f_c / f_yt
    r_sh_b = 0.09 * f_c / f_yt
    r_sh_min = max(r_sh_a, r_sh_b)
    return r_sh_min


@formula(*_AREA, limits=(*_LIMITS, _COMPRESSION))
def confinement_rectilinear_high(
    *, A_g: Area, A_ch: Area, f_c: Stress, f_yt: Stress, k_f: Ratio, k_n: Ratio, P_u: Force
) -> Ratio:
    """Least A_sh/(s b_c) of rectilinear hoops under a high axial force or in concrete above 10,000 psi."""
    r_sh_a = 0.3 * (A_g / A_ch - 1) * f_c / f_yt
    r_sh_b = 0.09 * f_c / f_yt
    r_sh_c = 0.2 * k_f * k_n * P_u / (f_yt * A_ch)
    r_sh_min = max(r_sh_a, r_sh_b, r_sh_c)
    return r_sh_min


@formula(*_AREA, limits=_LIMITS)
def confinement_circular(*, A_g: Area, A_ch: Area, f_c: Stress, f_yt: Stress) -> Ratio:
    """Least volume ratio of circular hoops or of a spiral."""
    rho_s_d = 0.45 * (A_g / A_ch - 1) * f_c / f_yt
    rho_s_e = 0.12 * f_c / f_yt
    rho_s_min = max(rho_s_d, rho_s_e)
    return rho_s_min


@formula(*_AREA, limits=(*_LIMITS, _COMPRESSION))
def confinement_circular_high(*, A_g: Area, A_ch: Area, f_c: Stress, f_yt: Stress, k_f: Ratio, P_u: Force) -> Ratio:
    """Least volume ratio of circular hoops or of a spiral, high axial force or concrete above 10,000 psi."""
    rho_s_d = 0.45 * (A_g / A_ch - 1) * f_c / f_yt
    rho_s_e = 0.12 * f_c / f_yt
    rho_s_f = 0.35 * k_f * P_u / (f_yt * A_ch)
    rho_s_min = max(rho_s_d, rho_s_e, rho_s_f)
    return rho_s_min
