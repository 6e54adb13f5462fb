"""One-way shear of columns with axial force, ACI 318 10.6.2, 10.7.6.5 and 22.5.

`N_u` is positive in compression. Equation (b) of 318-19 Table 22.5.5.1 is permitted in place of (a); it is here for
whoever wants it, and the checks of columns take (a).
"""

from __future__ import annotations

from math import acos, ceil, floor, pi, sqrt

from calcpack.aci318.limits import CONCRETE, LIGHTWEIGHT
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, Limit, formula, inch, psi
from calcpack.units import Area, Count, Force, Length, Ratio, Stress

__all__ = [
    "area_of_legs",
    "area_of_tie_circular",
    "biaxial_shear",
    "biaxial_shear_maximum",
    "concrete_alone_14",
    "concrete_compression_14",
    "concrete_few_ties_19",
    "concrete_ratio_19",
    "concrete_tension_14",
    "concrete_with_ties_19",
    "depth_circular",
    "depth_of_layer_x",
    "depth_of_layer_y",
    "depth_one_layer",
    "depth_with_side_bars",
    "design_shear_strength",
    "phi_shear",
    "rows_beyond_x",
    "rows_beyond_y",
    "section_maximum",
    "shear_along_x",
    "shear_along_y",
    "shear_reinforcement_minimum",
    "shear_reinforcement_threshold",
    "shear_resultant",
    "shear_spacing",
    "size_effect",
    "steel_required",
    "steel_strength",
    "tension_area_circular",
    "tension_area_one_layer",
    "tension_area_with_side_bars",
    "tension_ratio",
    "width_circular",
    "width_x",
    "width_y",
    "yield_in_shear",
]


def _both(number: str) -> tuple[Clause, Clause]:
    return ACI_318_14(number), ACI_318_19(number)


_GEOMETRY = Clause("geometry of the section")
_CIRCULAR = _both("22.5.2.2")
_DEMAND = _both("10.5.1.1")
_TABLE = ACI_318_19("Table 22.5.5.1")
_LIMITS = (CONCRETE, LIGHTWEIGHT)
_COMPRESSION = Limit("N_u", "ACI 318-14 22.5.6.1, for compression", low=0)
_TENSION = Limit("N_u", "ACI 318-14 22.5.7.1, for tension", high=0)


# Demand


@formula(*_DEMAND)
def shear_along_x(*, V_ux: Force) -> Force:
    """Factored shear along x, whatever its sense."""
    V_u = abs(V_ux)
    return V_u


@formula(*_DEMAND)
def shear_along_y(*, V_uy: Force) -> Force:
    """Factored shear along y, whatever its sense."""
    V_u = abs(V_uy)
    return V_u


# A circular section is as strong in every direction: the resultant is verified, 318-19 R22.5.1.10.
@formula(*_DEMAND)
def shear_resultant(*, V_ux: Force, V_uy: Force) -> Force:
    """Resultant shear of a circular column."""
    V_u = sqrt(V_ux**2 + V_uy**2)
    return V_u


# Width, depth and tension reinforcement


@formula(_GEOMETRY)
def width_x(*, h: Length) -> Length:
    """Width of a rectangular column for shear along x."""
    b_w = h
    return b_w


@formula(_GEOMETRY)
def width_y(*, b: Length) -> Length:
    """Width of a rectangular column for shear along y."""
    b_w = b
    return b_w


@formula(*_CIRCULAR)
def width_circular(*, h: Length) -> Length:
    """Width of a solid circular column in shear."""
    b_w = h
    return b_w


@formula(*_CIRCULAR)
def depth_circular(*, h: Length) -> Length:
    """Effective depth of a circular column in shear.

    >>> depth_circular(h=20.0)
    16.0
    """
    d = 0.8 * h
    return d


@formula(_GEOMETRY)
def depth_of_layer_x(*, b: Length, c_cover: Length, d_bt: Length, d_b: Length) -> Length:
    """Depth along x of the outermost layer of bars."""
    d_t = b - (c_cover + d_bt + d_b / 2)
    return d_t


@formula(_GEOMETRY)
def depth_of_layer_y(*, h: Length, c_cover: Length, d_bt: Length, d_b: Length) -> Length:
    """Depth along y of the outermost layer of bars."""
    d_t = h - (c_cover + d_bt + d_b / 2)
    return d_t


@formula(_GEOMETRY)
def rows_beyond_x(*, d_t: Length, b: Length, s: Length) -> Count:
    """Rows of side bars farther than two thirds of the width b from the compressed face, the outermost layer apart."""
    n_rows = max(ceil((d_t - 2 / 3 * b) / s) - 1.0, 0.0)
    return n_rows


@formula(_GEOMETRY)
def rows_beyond_y(*, d_t: Length, h: Length, s: Length) -> Count:
    """Rows of side bars farther than two thirds of the depth h from the compressed face, the outermost layer apart."""
    n_rows = max(ceil((d_t - 2 / 3 * h) / s) - 1.0, 0.0)
    return n_rows


@formula(_GEOMETRY)
def depth_one_layer(*, d_t: Length) -> Length:
    """Effective depth where the outermost layer alone is tension reinforcement."""
    d = d_t
    return d


# Two bars a row, at s, 2 s, … from the outermost layer of n_face bars.
@formula(_GEOMETRY)
def depth_with_side_bars(*, d_t: Length, n_rows: Count, n_face: Count, s: Length) -> Length:
    """Effective depth to the centroid of the outermost layer and of rows of side bars.

    >>> depth_with_side_bars(d_t=20.0, n_rows=1.0, n_face=4.0, s=6.0)
    18.0
    """
    d = d_t - n_rows * (n_rows + 1) * s / (n_face + 2 * n_rows)
    return d


@formula(_TABLE)
def tension_area_one_layer(*, n_face: Count, A_b: Area) -> Area:
    """Tension reinforcement where the outermost layer alone is that."""
    A_s = n_face * A_b
    return A_s


@formula(_TABLE)
def tension_area_with_side_bars(*, n_face: Count, n_rows: Count, A_b: Area) -> Area:
    """Tension reinforcement of the outermost layer and of rows of side bars."""
    A_s = (n_face + 2 * n_rows) * A_b
    return A_s


# An arc of this half angle lies farther than 2/3 h from the compressed edge; of n bars on the circle it holds at
# least this many, in whatever direction the shear acts.
@formula(_TABLE)
def tension_area_circular(*, n_bars: Count, D_s: Length, h: Length, A_b: Area) -> Area:
    """Tension reinforcement of a circular column, the least of any direction."""
    A_s = floor(n_bars * acos(min(h / (3 * D_s), 1)) / pi) * A_b
    return A_s


@formula(_TABLE)
def tension_ratio(*, A_s: Area, b_w: Length, d: Length) -> Ratio:
    """Ratio of tension reinforcement."""
    rho_w = A_s / (b_w * d)
    return rho_w


# Strength of concrete


@formula(ACI_318_14("22.5.5.1"), empirical=True, limits=_LIMITS)
def concrete_alone_14(*, lamb: Ratio, f_c: Stress, b_w: Length, d: Length) -> Force:
    """Shear strength of concrete without axial force."""
    root_f_c = min(sqrt(f_c), 100)
    V_c = 2 * lamb * root_f_c * b_w * d
    return V_c


@formula(ACI_318_14("22.5.6.1"), empirical=True, limits=(*_LIMITS, _COMPRESSION))
def concrete_compression_14(*, N_u: Force, A_g: Area, lamb: Ratio, f_c: Stress, b_w: Length, d: Length) -> Force:
    """Shear strength of concrete with axial compression.

    >>> round(concrete_compression_14(N_u=160e3, A_g=192.0, lamb=1.0, f_c=4_000.0, b_w=12.0, d=13.75))
    29567
    """
    root_f_c = min(sqrt(f_c), 100)
    V_c = 2 * (1 + N_u / (2000 * A_g)) * lamb * root_f_c * b_w * d
    return V_c


@formula(ACI_318_14("22.5.7.1"), empirical=True, limits=(*_LIMITS, _TENSION))
def concrete_tension_14(*, N_u: Force, A_g: Area, lamb: Ratio, f_c: Stress, b_w: Length, d: Length) -> Force:
    """Shear strength of concrete with significant axial tension, which is negative."""
    root_f_c = min(sqrt(f_c), 100)
    V_c_a = 2 * (1 + N_u / (500 * A_g)) * lamb * root_f_c * b_w * d
    V_c = max(V_c_a, 0.0)
    return V_c


@formula(_TABLE, empirical=True, limits=_LIMITS)
def concrete_with_ties_19(*, N_u: Force, A_g: Area, lamb: Ratio, f_c: Stress, b_w: Length, d: Length) -> Force:
    """Shear strength of concrete with at least the minimum shear reinforcement, (a)."""
    root_f_c = min(sqrt(f_c), 100)
    axial_stress = min(N_u / (6 * A_g), 0.05 * f_c)
    V_c_a = (2 * lamb * root_f_c + axial_stress) * b_w * d
    V_c_max = 5 * lamb * root_f_c * b_w * d
    V_c = max(min(V_c_a, V_c_max), 0.0)
    return V_c


@formula(_TABLE, empirical=True, limits=_LIMITS)
def concrete_ratio_19(
    *, N_u: Force, A_g: Area, rho_w: Ratio, lamb: Ratio, f_c: Stress, b_w: Length, d: Length
) -> Force:
    """Shear strength of concrete with at least the minimum shear reinforcement, (b)."""
    root_f_c = min(sqrt(f_c), 100)
    axial_stress = min(N_u / (6 * A_g), 0.05 * f_c)
    V_c_a: Force = (8 * lamb * rho_w ** (1 / 3) * root_f_c + axial_stress) * b_w * d
    V_c_max = 5 * lamb * root_f_c * b_w * d
    V_c = max(min(V_c_a, V_c_max), 0.0)
    return V_c


@formula(_TABLE, empirical=True, limits=_LIMITS)
def concrete_few_ties_19(
    *, N_u: Force, A_g: Area, rho_w: Ratio, lambda_s: Ratio, lamb: Ratio, f_c: Stress, b_w: Length, d: Length
) -> Force:
    """Shear strength of concrete with less than the minimum shear reinforcement, (c)."""
    root_f_c = min(sqrt(f_c), 100)
    axial_stress = min(N_u / (6 * A_g), 0.05 * f_c)
    V_c_a: Force = (8 * lambda_s * lamb * rho_w ** (1 / 3) * root_f_c + axial_stress) * b_w * d
    V_c_max = 5 * lamb * root_f_c * b_w * d
    V_c = max(min(V_c_a, V_c_max), 0.0)
    return V_c


@formula(ACI_318_19("22.5.5.1.3"))
def size_effect(*, d: Length) -> Ratio:
    """Factor for the effect of member depth on shear.

    >>> size_effect(d=10.0), round(size_effect(d=40.0), 4)
    (1.0, 0.6325)
    """
    lambda_s = min(sqrt(2 / (1 + d / (10 * inch))), 1.0)
    return lambda_s


# Shear reinforcement


@formula(ACI_318_14("Table 20.2.2.4a"), ACI_318_19("Table 20.2.2.4a"))
def yield_in_shear(*, f_yt: Stress) -> Stress:
    """Yield strength of ties, hoops and spirals that counts in shear."""
    f_yt_v = min(f_yt, 60000 * psi)
    return f_yt_v


@formula(ACI_318_14("22.5.10.5.5"), ACI_318_19("22.5.8.5.5"))
def area_of_legs(*, n_legs: Count, A_bt: Area) -> Area:
    """Area of the legs of ties parallel to the shear."""
    A_v = n_legs * A_bt
    return A_v


@formula(ACI_318_14("22.5.10.5.6"), ACI_318_19("22.5.8.5.6"))
def area_of_tie_circular(*, A_sp: Area) -> Area:
    """Area of a circular tie or a turn of spiral that resists shear."""
    A_v = 2 * A_sp
    return A_v


@formula(ACI_318_14("22.5.10.5.3"), ACI_318_19("22.5.8.5.3"))
def steel_strength(*, A_v: Area, f_yt_v: Stress, d: Length, s: Length) -> Force:
    """Shear strength of ties or of a spiral.

    >>> round(steel_strength(A_v=0.22, f_yt_v=40e3, d=13.75, s=6.75))
    17926
    """
    V_s = A_v * f_yt_v * d / s
    return V_s


@formula(ACI_318_14("22.5.10.1"), ACI_318_19("22.5.8.1"))
def steel_required(*, V_u: Force, phi: Ratio, V_c: Force) -> Force:
    """Shear strength that ties or a spiral have to provide."""
    V_s_req = max(V_u / phi, V_c) - V_c
    return V_s_req


@formula(*_both("10.6.2.1"))
def shear_reinforcement_threshold(*, phi: Ratio, V_c: Force) -> Force:
    """Shear above which the minimum of shear reinforcement is required."""
    half_phi_V_c = 0.5 * phi * V_c
    return half_phi_V_c


@formula(*_both("10.6.2.2"), empirical=True, limits=(CONCRETE,))
def shear_reinforcement_minimum(*, f_c: Stress, b_w: Length, s: Length, f_yt_v: Stress) -> Area:
    """Least area of shear reinforcement."""
    A_v_min = max(0.75 * sqrt(f_c), 50) * b_w * s / f_yt_v
    return A_v_min


@formula(*_both("Table 10.7.6.5.2"), empirical=True, limits=(CONCRETE,))
def shear_spacing(*, V_s_req: Force, f_c: Stress, b_w: Length, d: Length) -> Length:
    """Largest spacing of shear reinforcement."""
    if V_s_req <= 4 * sqrt(f_c) * b_w * d:
        s_max = min(d / 2, 24 * inch)
    else:
        s_max = min(d / 4, 12 * inch)
    return s_max


# Strength of the section


@formula(*_both("Table 21.2.1"))
def phi_shear() -> Ratio:
    """Strength reduction factor of shear."""
    phi = 0.75
    return phi


@formula(*_both("22.5.1.1"))
def design_shear_strength(*, phi: Ratio, V_c: Force, V_s: Force) -> Force:
    """Design shear strength."""
    V_n = V_c + V_s
    phi_V_n = phi * V_n
    return phi_V_n


@formula(*_both("22.5.1.2"), empirical=True, limits=(CONCRETE,))
def section_maximum(*, phi: Ratio, V_c: Force, f_c: Stress, b_w: Length, d: Length) -> Force:
    """Largest factored shear that the dimensions of the section allow."""
    V_u_max = phi * (V_c + 8 * sqrt(f_c) * b_w * d)
    return V_u_max


@formula(ACI_318_19("22.5.1.11"))
def biaxial_shear(*, V_ux: Force, phi_V_nx: Force, V_uy: Force, phi_V_ny: Force) -> Ratio:
    """Sum of the ratios of shear to design strength along x and y."""
    r_V = abs(V_ux) / phi_V_nx + abs(V_uy) / phi_V_ny
    return r_V


@formula(ACI_318_19("22.5.1.11"))
def biaxial_shear_maximum() -> Ratio:
    """Largest sum of ratios where both are above one half."""
    r_V_max = 1.5
    return r_V_max
