"""Ties and spirals of columns, ACI 318 25.7.2 and 25.7.3."""

from __future__ import annotations

from math import pi

from calcpack.aci318.limits import BAR_DIAMETER, CONCRETE
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, Limit, formula, inch
from calcpack.units import Area, Length, Ratio, Stress

__all__ = [
    "core_area",
    "core_diameter",
    "spiral_clear",
    "spiral_clear_maximum",
    "spiral_clear_minimum",
    "spiral_clear_minimum_aggregate",
    "spiral_ratio",
    "spiral_ratio_minimum",
    "spiral_size",
    "tie_clear_minimum",
    "tie_size",
    "tie_spacing",
    "unsupported_bar_maximum",
]

_TIE_SPACING = (ACI_318_14("25.7.2.1"), ACI_318_19("25.7.2.1"))
_SPIRAL_CLEAR = (ACI_318_14("25.7.3.1"), ACI_318_19("25.7.3.1"))
_SPIRAL_RATIO = (ACI_318_14("25.7.3.3"), ACI_318_19("25.7.3.3"))
_GEOMETRY = Clause("geometry of the section")
_YIELD_SPIRAL = Limit("f_yt", "ACI 318-14 and 318-19 25.7.3.3", low=40_000, high=100_000)


@formula(ACI_318_14("25.7.2.2"), ACI_318_19("25.7.2.2"), limits=(BAR_DIAMETER,))
def tie_size(*, d_b: Length) -> Length:
    """Least diameter of ties: No. 3 around No. 10 and smaller bars, else No. 4."""
    if d_b <= 1.27 * inch:
        d_bt_min = 0.375 * inch
    else:
        d_bt_min = 0.5 * inch
    return d_bt_min


@formula(*_TIE_SPACING)
def tie_spacing(*, d_b: Length, d_bt: Length, h_min: Length) -> Length:
    """Largest centre-to-centre spacing of ties.

    >>> tie_spacing(d_b=0.875, d_bt=0.375, h_min=14.0)
    14.0
    """
    s_max = min(16 * d_b, 48 * d_bt, h_min)
    return s_max


@formula(*_TIE_SPACING)
def tie_clear_minimum(*, d_agg: Length) -> Length:
    """Least clear spacing of ties."""
    s_clear_min = 4 / 3 * d_agg
    return s_clear_min


@formula(ACI_318_14("25.7.2.3"), ACI_318_19("25.7.2.3"))
def unsupported_bar_maximum() -> Length:
    """Largest clear distance of a bar without lateral support from one that has it."""
    x_clear_max = 6 * inch
    return x_clear_max


@formula(ACI_318_14("25.7.3.2"), ACI_318_19("25.7.3.2"))
def spiral_size() -> Length:
    """Least diameter of spirals in cast-in-place columns."""
    d_bt_min = 0.375 * inch
    return d_bt_min


@formula(_GEOMETRY)
def spiral_clear(*, s: Length, d_bt: Length) -> Length:
    """Clear spacing of the turns of a spiral, or of ties."""
    s_clear = s - d_bt
    return s_clear


@formula(*_SPIRAL_CLEAR)
def spiral_clear_maximum() -> Length:
    """Largest clear spacing of the turns of a spiral."""
    s_clear_max = 3 * inch
    return s_clear_max


@formula(*_SPIRAL_CLEAR)
def spiral_clear_minimum() -> Length:
    """Least clear spacing of the turns of a spiral, the aggregate not stated."""
    s_clear_min = 1 * inch
    return s_clear_min


@formula(*_SPIRAL_CLEAR)
def spiral_clear_minimum_aggregate(*, d_agg: Length) -> Length:
    """Least clear spacing of the turns of a spiral."""
    s_clear_min = max(1 * inch, 4 / 3 * d_agg)
    return s_clear_min


@formula(_GEOMETRY)
def core_diameter(*, h: Length, c_cover: Length) -> Length:
    """Diameter of the core, out to out of the spiral."""
    D_c = h - 2 * c_cover
    return D_c


@formula(_GEOMETRY)
def core_area(*, D_c: Length) -> Area:
    """Area of the core, out to out of the spiral."""
    A_ch = pi / 4 * D_c**2
    return A_ch


# The turn is taken along its centre line, pi*(D_c - d_bt), over the core volume pi/4*D_c**2*s. Taking it along the
# outside, pi*D_c, gives 4*A_sp/(D_c*s): some 2 % more, and not what the spiral provides.
@formula(ACI_318_14("2.2"), ACI_318_19("2.2"))
def spiral_ratio(*, A_sp: Area, D_c: Length, d_bt: Length, s: Length) -> Ratio:
    """Volume ratio of a spiral to the core it encloses, the turn measured along its centre line."""
    rho_s = 4 * A_sp * (D_c - d_bt) / (s * D_c**2)
    return rho_s


@formula(*_SPIRAL_RATIO, limits=(CONCRETE, _YIELD_SPIRAL))
def spiral_ratio_minimum(*, A_g: Area, A_ch: Area, f_c: Stress, f_yt: Stress) -> Ratio:
    """Least volume ratio of a spiral."""
    rho_s_min = 0.45 * (A_g / A_ch - 1) * f_c / f_yt
    return rho_s_min
