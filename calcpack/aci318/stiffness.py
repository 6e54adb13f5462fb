"""Flexural stiffness of columns for critical loads, ACI 318 19.2.2 and 6.6.4.4.4."""

from __future__ import annotations

from math import pi, sqrt

from calcpack.aci318.limits import CONCRETE
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, Limit, formula
from calcpack.units import Area, Count, Length, Ratio, Rigidity, SecondMoment, Stress

__all__ = [
    "bar_row_x",
    "bar_row_y",
    "bars_moment_about_x",
    "bars_moment_about_y",
    "bars_moment_circular",
    "modulus",
    "modulus_lightweight",
    "second_moment_about_x",
    "second_moment_about_y",
    "second_moment_circular",
    "stiffness_bars",
    "stiffness_gross",
]


def _both(number: str) -> tuple[Clause, Clause]:
    return ACI_318_14(number), ACI_318_19(number)


_GEOMETRY = Clause("geometry of the section")
_SHARE = Limit("beta_dns", "ACI 318-14 and 318-19 6.6.4.4.4", low=0.0, high=1.0)


@formula(*_both("19.2.2.1(b)"), empirical=True, limits=(CONCRETE,))
def modulus(*, f_c: Stress) -> Stress:
    """Modulus of elasticity of normalweight concrete.

    >>> round(modulus(f_c=4_000.0))
    3604997
    """
    E_c = 57000 * sqrt(f_c)
    return E_c


# 33 w_c**1.5 sqrt(f_c) with the least density of the clause, in lb/ft^3: the least stiffness it can give.
@formula(*_both("19.2.2.1(a)"), empirical=True, limits=(CONCRETE,))
def modulus_lightweight(*, f_c: Stress) -> Stress:
    """Modulus of elasticity of lightweight concrete of a density not stated: at 90 lb/ft^3, the least of the clause."""
    E_c: Stress = 90**1.5 * 33 * sqrt(f_c)
    return E_c


@formula(_GEOMETRY)
def second_moment_about_x(*, b: Length, h: Length) -> SecondMoment:
    """Second moment of a rectangular gross section, bending about x."""
    I_g = b * h**3 / 12
    return I_g


@formula(_GEOMETRY)
def second_moment_about_y(*, b: Length, h: Length) -> SecondMoment:
    """Second moment of a rectangular gross section, bending about y."""
    I_g = h * b**3 / 12
    return I_g


@formula(_GEOMETRY)
def second_moment_circular(*, h: Length) -> SecondMoment:
    """Second moment of a circular gross section."""
    I_g = pi / 64 * h**4
    return I_g


@formula(_GEOMETRY)
def bar_row_y(*, h: Length, c_cover: Length, d_bt: Length, d_b: Length) -> Length:
    """Distance of the outer rows of bars from the x axis."""
    y_s = h / 2 - c_cover - d_bt - d_b / 2
    return y_s


@formula(_GEOMETRY)
def bar_row_x(*, b: Length, c_cover: Length, d_bt: Length, d_b: Length) -> Length:
    """Distance of the outer rows of bars from the y axis."""
    x_s = b / 2 - c_cover - d_bt - d_b / 2
    return x_s


# n rows spaced evenly from -y_s to y_s: the squares of their distances sum to y_s**2 n (n + 1)/(3 (n - 1)). Each holds
# two bars, the outer two n_x.
@formula(_GEOMETRY)
def bars_moment_about_x(*, A_b: Area, y_s: Length, n_x: Count, n_y: Count) -> SecondMoment:
    """Second moment of the bars of a rectangular column about x."""
    I_se = 2 * A_b * y_s**2 * (n_x - 2 + n_y * (n_y + 1) / (3 * (n_y - 1)))
    return I_se


@formula(_GEOMETRY)
def bars_moment_about_y(*, A_b: Area, x_s: Length, n_x: Count, n_y: Count) -> SecondMoment:
    """Second moment of the bars of a rectangular column about y."""
    I_se = 2 * A_b * x_s**2 * (n_y - 2 + n_x * (n_x + 1) / (3 * (n_x - 1)))
    return I_se


@formula(_GEOMETRY)
def bars_moment_circular(*, A_st: Area, D_s: Length) -> SecondMoment:
    """Second moment of three or more bars, evenly spaced on a circle, about any axis through its centre."""
    I_se = A_st * D_s**2 / 8
    return I_se


@formula(*_both("6.6.4.4.4(a)"), limits=(_SHARE,))
def stiffness_gross(*, E_c: Stress, I_g: SecondMoment, beta_dns: Ratio) -> Rigidity:
    """Effective flexural stiffness from the gross section."""
    EI_eff = 0.4 * E_c * I_g / (1 + beta_dns)
    return EI_eff


@formula(*_both("6.6.4.4.4(b)"), limits=(_SHARE,))
def stiffness_bars(*, E_c: Stress, I_g: SecondMoment, E_s: Stress, I_se: SecondMoment, beta_dns: Ratio) -> Rigidity:
    """Effective flexural stiffness from the gross section and its bars."""
    EI = 0.2 * E_c * I_g + E_s * I_se
    EI_eff = EI / (1 + beta_dns)
    return EI_eff
