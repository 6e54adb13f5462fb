"""Lap splices, ACI 318 25.5, and the reductions of compression laps in columns, 10.7.5.2.1.

A tension lap starts from the development length by the equation, before its 12 in minimum and without reduction for
excess reinforcement.
"""

from __future__ import annotations

from calcpack.aci318 import development
from calcpack.aci318.factors import cited_in
from calcpack.aci318.limits import BAR_DIAMETER_TO_NO_11, CONCRETE, YIELD_80, YIELD_100, YIELD_LEAST
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import formula, inch, psi
from calcpack.units import Length, Stress

__all__ = [
    "lap_class_a",
    "lap_class_b",
    "lap_close_bars",
    "lap_compression",
    "lap_compression_high_grade",
    "lap_in_spiral",
    "lap_in_ties",
    "lap_transverse_index_minimum",
    "lap_without_reduction",
]

_TENSION = (ACI_318_14("Table 25.5.2.1"), ACI_318_19("Table 25.5.2.1"))
_COLUMN = (ACI_318_14("10.7.5.2.1"), ACI_318_19("10.7.5.2.1"))


@formula(*_TENSION)
def lap_class_a(*, l_d_a: Length) -> Length:
    """Tension lap, class A, not less than 12 in."""
    l_st = max(1.0 * l_d_a, 12 * inch)
    return l_st


@formula(*_TENSION)
def lap_class_b(*, l_d_a: Length) -> Length:
    """Tension lap, class B, not less than 12 in."""
    l_st = max(1.3 * l_d_a, 12 * inch)
    return l_st


@formula(
    ACI_318_14("25.5.5.1"),
    ACI_318_19("25.5.5.1"),
    empirical=True,
    limits=(CONCRETE, YIELD_LEAST, YIELD_80, BAR_DIAMETER_TO_NO_11),
)
def lap_compression(*, f_y: Stress, f_c: Stress, d_b: Length) -> Length:
    """Compression lap, not less than 12 in; a third longer in concrete below 3,000 psi.

    >>> lap_compression(f_y=60_000.0, f_c=4_000.0, d_b=1.0)
    30.0
    """
    if f_y <= 60000 * psi and f_c >= 3000 * psi:
        l_sc_a = max(0.0005 * f_y * d_b, 12 * inch)
    elif f_y <= 60000 * psi:
        l_sc_a = 4 / 3 * max(0.0005 * f_y * d_b, 12 * inch)
    elif f_c >= 3000 * psi:
        l_sc_a = max((0.0009 * f_y - 24) * d_b, 12 * inch)
    else:
        l_sc_a = 4 / 3 * max((0.0009 * f_y - 24) * d_b, 12 * inch)
    return l_sc_a


@formula(ACI_318_19("25.5.5.1(c)"), empirical=True, limits=(CONCRETE, YIELD_LEAST, YIELD_100, BAR_DIAMETER_TO_NO_11))
def lap_compression_high_grade(*, f_y: Stress, f_c: Stress, d_b: Length, l_st: Length) -> Length:
    """Compression lap of bars above Grade 80, not less than the tension lap."""
    if f_c >= 3000 * psi:
        l_sc_a = max((0.0009 * f_y - 24) * d_b, l_st)
    else:
        l_sc_a = 4 / 3 * max((0.0009 * f_y - 24) * d_b, l_st)
    return l_sc_a


@formula(ACI_318_14("25.5.5.1"), ACI_318_19("25.5.5.1"))
def lap_without_reduction(*, l_sc_a: Length) -> Length:
    """Compression lap outside a column's ties or spiral."""
    l_sc = l_sc_a
    return l_sc


@formula(*_COLUMN)
def lap_in_ties(*, l_sc_a: Length) -> Length:
    """Compression lap in column ties of 0.0015 h s or more in both directions, not less than 12 in."""
    l_sc = max(0.83 * l_sc_a, 12 * inch)
    return l_sc


@formula(*_COLUMN)
def lap_in_spiral(*, l_sc_a: Length) -> Length:
    """Compression lap inside a column spiral, not less than 12 in."""
    l_sc = max(0.75 * l_sc_a, 12 * inch)
    return l_sc


lap_close_bars = cited_in(development.close_bars, ACI_318_19("25.5.1.5"))
lap_transverse_index_minimum = cited_in(development.transverse_index_minimum, ACI_318_19("25.5.1.5"))
