"""Bars under axial force and bending by strain compatibility, ACI 318 22.2, and phi by their strain, 21.2.

Strains, stresses and forces of bars are positive in compression, as is P. M_nx is the sum of force times y, M_ny that
of force times x.
"""

from __future__ import annotations

from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, formula
from calcpack.units import Area, Force, Length, Moment, Ratio, Stress

__all__ = [
    "axial_sum",
    "bar_depth",
    "bar_depth_x",
    "bar_depth_y",
    "bar_force",
    "bar_strain",
    "bar_stress",
    "moment_sum_x",
    "moment_sum_y",
    "moment_x",
    "moment_y",
    "phi_spiral_14",
    "phi_spiral_19",
    "phi_tied_14",
    "phi_tied_19",
    "tension_strain",
    "yield_strain",
    "yield_strain_grade_60",
]

_PHI_14, _PHI_19 = ACI_318_14("Table 21.2.2"), ACI_318_19("Table 21.2.2")
_STRAIN = (ACI_318_14("22.2.1.2"), ACI_318_19("22.2.1.2"))
_STEEL = (ACI_318_14("20.2.2.1"), ACI_318_19("20.2.2.1"))
_EQUILIBRIUM = (ACI_318_14("22.2.1.1"), ACI_318_19("22.2.1.1"))
_GEOMETRY = Clause("geometry of the section")


@formula(_GEOMETRY)
def bar_depth(*, h_u: Length, u_x: Ratio, u_y: Ratio, x: Length, y: Length) -> Length:
    """Depth of a bar below the extreme compression fibre, square to the neutral axis."""
    d_s = h_u - (u_x * x + u_y * y)
    return d_s


@formula(_GEOMETRY)
def bar_depth_x(*, h_u: Length, u_y: Ratio, y: Length) -> Length:
    """Depth of a bar below the extreme compression fibre, bending about x alone."""
    d_s = h_u - u_y * y
    return d_s


@formula(_GEOMETRY)
def bar_depth_y(*, h_u: Length, u_x: Ratio, x: Length) -> Length:
    """Depth of a bar below the extreme compression fibre, bending about y alone."""
    d_s = h_u - u_x * x
    return d_s


@formula(*_STRAIN)
def bar_strain(*, eps_cu: Ratio, c: Length, d_s: Length) -> Ratio:
    """Strain of a bar, plane sections."""
    eps_s = eps_cu * (c - d_s) / c
    return eps_s


@formula(*_STEEL)
def bar_stress(*, E_s: Stress, eps_s: Ratio, f_y: Stress) -> Stress:
    """Stress of a bar, elastic to its yield strength."""
    f_s = max(-f_y, min(f_y, E_s * eps_s))
    return f_s


@formula(*_EQUILIBRIUM)
def bar_force(*, A_b: Area, f_s: Stress, f_c: Stress, d_s: Length, a: Length) -> Force:
    """Force of a bar; one whose centre lies inside the block displaces concrete."""
    if d_s < a:
        F_s = A_b * (f_s - 0.85 * f_c)
    else:
        F_s = A_b * f_s
    return F_s


@formula(*_EQUILIBRIUM)
def moment_x(*, F_s: Force, y: Length) -> Moment:
    """Moment of a bar about the x axis."""
    M_Fx = F_s * y
    return M_Fx


@formula(*_EQUILIBRIUM)
def moment_y(*, F_s: Force, x: Length) -> Moment:
    """Moment of a bar about the y axis."""
    M_Fy = F_s * x
    return M_Fy


@formula(*_EQUILIBRIUM)
def axial_sum(*, C_c: Force, F_s_sum: Force) -> Force:
    """Nominal axial strength at this neutral axis."""
    P_n = C_c + F_s_sum
    return P_n


@formula(*_EQUILIBRIUM)
def moment_sum_x(*, C_c: Force, y_c: Length, M_Fx_sum: Moment) -> Moment:
    """Nominal moment strength about x at this neutral axis."""
    M_nx = C_c * y_c + M_Fx_sum
    return M_nx


@formula(*_EQUILIBRIUM)
def moment_sum_y(*, C_c: Force, x_c: Length, M_Fy_sum: Moment) -> Moment:
    """Nominal moment strength about y at this neutral axis."""
    M_ny = C_c * x_c + M_Fy_sum
    return M_ny


@formula(*_STRAIN)
def tension_strain(*, eps_cu: Ratio, c: Length, d_t: Length) -> Ratio:
    """Net tensile strain of the extreme tension bar, square to the neutral axis."""
    eps_t = eps_cu * (d_t - c) / c
    return eps_t


@formula(ACI_318_14("21.2.2.1"), ACI_318_19("21.2.2.1"))
def yield_strain(*, f_y: Stress, E_s: Stress) -> Ratio:
    """Yield strain of the bars."""
    eps_ty = f_y / E_s
    return eps_ty


@formula(ACI_318_14("21.2.2.1"))
def yield_strain_grade_60() -> Ratio:
    """Yield strain of Grade 60 bars, as it is permitted to be taken."""
    eps_ty = 0.002
    return eps_ty


@formula(_PHI_14)
def phi_tied_14(*, eps_t: Ratio, eps_ty: Ratio) -> Ratio:
    """Strength reduction factor of a tied column, by the strain of the extreme tension bar.

    >>> round(phi_tied_14(eps_t=0.004, eps_ty=0.002), 4)
    0.8167
    """
    if eps_t <= eps_ty:
        phi = 0.65
    elif eps_t < 0.005:
        phi = 0.65 + 0.25 * (eps_t - eps_ty) / (0.005 - eps_ty)
    else:
        phi = 0.9
    return phi


@formula(_PHI_14)
def phi_spiral_14(*, eps_t: Ratio, eps_ty: Ratio) -> Ratio:
    """Strength reduction factor of a spiral column, by the strain of the extreme tension bar."""
    if eps_t <= eps_ty:
        phi = 0.75
    elif eps_t < 0.005:
        phi = 0.75 + 0.15 * (eps_t - eps_ty) / (0.005 - eps_ty)
    else:
        phi = 0.9
    return phi


@formula(_PHI_19)
def phi_tied_19(*, eps_t: Ratio, eps_ty: Ratio) -> Ratio:
    """Strength reduction factor of a tied column, by the strain of the extreme tension bar."""
    if eps_t <= eps_ty:
        phi = 0.65
    elif eps_t < eps_ty + 0.003:
        phi = 0.65 + 0.25 * (eps_t - eps_ty) / 0.003
    else:
        phi = 0.9
    return phi


@formula(_PHI_19)
def phi_spiral_19(*, eps_t: Ratio, eps_ty: Ratio) -> Ratio:
    """Strength reduction factor of a spiral column, by the strain of the extreme tension bar."""
    if eps_t <= eps_ty:
        phi = 0.75
    elif eps_t < eps_ty + 0.003:
        phi = 0.75 + 0.15 * (eps_t - eps_ty) / 0.003
    else:
        phi = 0.9
    return phi
