"""Which lap a splice needs, laps of different sizes, and mechanical splices, ACI 318 25.5 and 10.7.5.2.

The class of a tension lap is chosen from the stress of the bars and the share of them spliced at one place: of beams
and walls by areas, Table 25.5.2.1; of columns by the bar stress, Table 10.7.5.2.2.
"""

from __future__ import annotations

from calcpack.aci318.limits import YIELD_100, YIELD_LEAST
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, Limit, formula, inch
from calcpack.units import Area, Force, Length, Ratio, Stress

__all__ = [
    "lap_by_area",
    "lap_by_bar_stress",
    "lap_compression_of_sizes",
    "lap_tension_of_sizes",
    "lap_tie_area_minimum",
    "mechanical_splice",
]


def _both(number: str) -> tuple[Clause, Clause]:
    return ACI_318_14(number), ACI_318_19(number)


_SHARE = Limit("r_spliced", "a share of the bars", low=0.0, high=1.0)


@formula(*_both("Table 25.5.2.1"), limits=(_SHARE,))
def lap_by_area(*, l_d_a: Length, A_s_required: Area, A_s_provided: Area, r_spliced: Ratio) -> Length:
    """Tension lap, its class by the area provided and the share of bars spliced, not less than 12 in."""
    if A_s_provided >= 2 * A_s_required and r_spliced <= 0.5:
        l_st = max(1.0 * l_d_a, 12 * inch)
    else:
        l_st = max(1.3 * l_d_a, 12 * inch)
    return l_st


@formula(*_both("Table 10.7.5.2.2"), limits=(_SHARE,))
def lap_by_bar_stress(*, l_d_a: Length, r_stress: Ratio, r_spliced: Ratio) -> Length:
    """Tension lap of column bars, its class by the tensile stress and the share of bars spliced, at least 12 in."""
    if r_stress <= 0.5 and r_spliced <= 0.5:
        l_st = max(1.0 * l_d_a, 12 * inch)
    else:
        l_st = max(1.3 * l_d_a, 12 * inch)
    return l_st


@formula(*_both("25.5.2.2"))
def lap_tension_of_sizes(*, l_d: Length, l_st_s: Length) -> Length:
    """Tension lap of bars of two sizes: development of the larger bar, or lap of the smaller bar.

    >>> lap_tension_of_sizes(l_d=47.4, l_st_s=37.0)
    47.4
    """
    l_st = max(l_d, l_st_s)
    return l_st


@formula(*_both("25.5.5.4"))
def lap_compression_of_sizes(*, l_dc: Length, l_sc_s: Length) -> Length:
    """Compression lap of bars of two sizes: development of the larger bar, or lap of the smaller bar."""
    l_sc = max(l_dc, l_sc_s)
    return l_sc


@formula(*_both("25.5.7.1"), limits=(YIELD_LEAST, YIELD_100))
def mechanical_splice(*, f_y: Stress, A_b: Area) -> Force:
    """Force that a mechanical or welded splice develops, a quarter above the yield force of the bar.

    >>> round(mechanical_splice(f_y=60_000.0, A_b=0.79))
    59250
    """
    P_splice = 1.25 * f_y * A_b
    return P_splice


@formula(*_both("10.7.5.2.1"))
def lap_tie_area_minimum(*, h: Length, s: Length) -> Area:
    """Area of tie legs across a column's dimension, from which a compression lap is reduced."""
    A_tie_min = 0.0015 * h * s
    return A_tie_min
