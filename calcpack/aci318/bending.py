"""A load against the strength under axial force and bending, ACI 318 22.4, and an independent check of it.

The ratio is taken along the ray from the origin through the load (P_u, M_ux, M_uy). The lengths of load and strength
are compared with the moments over the size of the section; on one ray their quotient is the same whatever moments are
divided by.
"""

from __future__ import annotations

from math import sqrt

from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, formula
from calcpack.units import Area, Force, Length, Moment, Ratio, Stress

__all__ = [
    "difference",
    "eccentricity_difference_x",
    "eccentricity_difference_y",
    "eccentricity_x",
    "eccentricity_y",
    "load_length",
    "load_length_circular",
    "load_length_x",
    "load_length_y",
    "load_length_y_circular",
    "load_share",
    "phi_tension",
    "reciprocal_difference",
    "reciprocal_least",
    "reciprocal_load",
    "strength_length",
    "strength_length_circular",
    "strength_length_x",
    "strength_length_y",
    "strength_length_y_circular",
    "tension_force",
    "tension_strength",
]

_STRENGTH = (ACI_318_14("22.4.1.1"), ACI_318_19("22.4.1.1"))
_RAY = Clause("ratio on a ray")
_RECIPROCAL = Clause("reciprocal load method, B. Bresler, ACI Journal 57, 1960")
_GEOMETRY = Clause("geometry of the section")


@formula(_RAY)
def load_length(*, P_u: Force, M_ux: Moment, M_uy: Moment, b: Length, h: Length) -> Force:
    """Distance of the load from the origin."""
    R_u = sqrt(P_u**2 + (M_ux / h) ** 2 + (M_uy / b) ** 2)
    return R_u


@formula(_RAY)
def load_length_circular(*, P_u: Force, M_ux: Moment, M_uy: Moment, h: Length) -> Force:
    """Distance of the load from the origin."""
    R_u = sqrt(P_u**2 + (M_ux / h) ** 2 + (M_uy / h) ** 2)
    return R_u


@formula(_RAY)
def load_length_x(*, P_u: Force, M_ux: Moment, h: Length) -> Force:
    """Distance of the load from the origin, bending about x alone."""
    R_u = sqrt(P_u**2 + (M_ux / h) ** 2)
    return R_u


@formula(_RAY)
def load_length_y(*, P_u: Force, M_uy: Moment, b: Length) -> Force:
    """Distance of the load from the origin, bending about y alone."""
    R_u = sqrt(P_u**2 + (M_uy / b) ** 2)
    return R_u


@formula(*_STRENGTH)
def strength_length(*, phi: Ratio, P_n: Force, M_nx: Moment, M_ny: Moment, b: Length, h: Length) -> Force:
    """Distance of the design strength from the origin."""
    phi_R_n = phi * sqrt(P_n**2 + (M_nx / h) ** 2 + (M_ny / b) ** 2)
    return phi_R_n


@formula(*_STRENGTH)
def strength_length_circular(*, phi: Ratio, P_n: Force, M_nx: Moment, M_ny: Moment, h: Length) -> Force:
    """Distance of the design strength from the origin."""
    phi_R_n = phi * sqrt(P_n**2 + (M_nx / h) ** 2 + (M_ny / h) ** 2)
    return phi_R_n


@formula(*_STRENGTH)
def strength_length_x(*, phi: Ratio, P_n: Force, M_nx: Moment, h: Length) -> Force:
    """Distance of the design strength from the origin, bending about x alone."""
    phi_R_n = phi * sqrt(P_n**2 + (M_nx / h) ** 2)
    return phi_R_n


@formula(*_STRENGTH)
def strength_length_y(*, phi: Ratio, P_n: Force, M_ny: Moment, b: Length) -> Force:
    """Distance of the design strength from the origin, bending about y alone."""
    phi_R_n = phi * sqrt(P_n**2 + (M_ny / b) ** 2)
    return phi_R_n


@formula(_RAY)
def load_length_y_circular(*, P_u: Force, M_uy: Moment, h: Length) -> Force:
    """Distance of the load from the origin, bending about y alone."""
    R_u = sqrt(P_u**2 + (M_uy / h) ** 2)
    return R_u


@formula(*_STRENGTH)
def strength_length_y_circular(*, phi: Ratio, P_n: Force, M_ny: Moment, h: Length) -> Force:
    """Distance of the design strength from the origin, bending about y alone."""
    phi_R_n = phi * sqrt(P_n**2 + (M_ny / h) ** 2)
    return phi_R_n


@formula(_RAY)
def load_share(*, R_u: Force, phi_R_n: Force) -> Ratio:
    """Load over design strength along the ray."""
    k_u = R_u / phi_R_n
    return k_u


@formula(_RAY)
def difference(*, S_u: Force, S_n: Force, phi: Ratio, k_u: Ratio, R_u: Force) -> Ratio:
    """What is left between a part of the load and the same part of the strength, over the length of the load."""
    Delta = (S_u - k_u * phi * S_n) / R_u
    return Delta


@formula(_GEOMETRY)
def tension_force(*, P_u: Force) -> Force:
    """Factored axial tension."""
    T_ut = -P_u
    return T_ut


@formula(ACI_318_14("Table 21.2.2"), ACI_318_19("Table 21.2.2"))
def phi_tension() -> Ratio:
    """Strength reduction factor of a section in tension throughout."""
    phi = 0.9
    return phi


@formula(ACI_318_14("22.4.3.1"), ACI_318_19("22.4.3.1"))
def tension_strength(*, phi: Ratio, f_y: Stress, A_st: Area) -> Force:
    """Design axial strength in tension."""
    phi_P_nt = phi * f_y * A_st
    return phi_P_nt


@formula(_GEOMETRY)
def eccentricity_x(*, M_uy: Moment, P_u: Force) -> Length:
    """Eccentricity along x."""
    e_x = M_uy / P_u
    return e_x


@formula(_GEOMETRY)
def eccentricity_y(*, M_ux: Moment, P_u: Force) -> Length:
    """Eccentricity along y."""
    e_y = M_ux / P_u
    return e_y


@formula(_GEOMETRY)
def eccentricity_difference_y(*, e_n: Length, e_y: Length, h: Length) -> Ratio:
    """Eccentricity of the strength less that of the load, over the size of the section."""
    Delta = (e_n - e_y) / h
    return Delta


@formula(_GEOMETRY)
def eccentricity_difference_x(*, e_n: Length, e_x: Length, b: Length) -> Ratio:
    """Eccentricity of the strength less that of the load, over the size of the section."""
    Delta = (e_n - e_x) / b
    return Delta


@formula(_RECIPROCAL)
def reciprocal_load(*, P_nx: Force, P_ny: Force, P_o: Force) -> Force:
    """Nominal axial strength with both eccentricities, from the strengths with each of them alone.

    >>> round(reciprocal_load(P_nx=808.775, P_ny=1148.662, P_o=1821.6), 2)
    641.83
    """
    P_n_recip = 1 / (1 / P_nx + 1 / P_ny - 1 / P_o)
    return P_n_recip


@formula(_RECIPROCAL)
def reciprocal_least(*, f_c: Stress, A_g: Area) -> Force:
    """Axial strength below which the reciprocal load is not meant to be used."""
    P_n_least = 0.1 * f_c * A_g
    return P_n_least


@formula(_RECIPROCAL)
def reciprocal_difference(*, P_n_recip: Force, P_n: Force) -> Ratio:
    """Reciprocal load against the strength by strain compatibility."""
    Delta_recip = (P_n_recip - P_n) / P_n
    return Delta_recip
