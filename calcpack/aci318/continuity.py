"""Bars that continue in beams: past a section, into a support, past an inflection; integrity. ACI 318 9.7."""

from __future__ import annotations

from calcpack.aci318.factors import cited_in
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, formula, inch
from calcpack.units import Area, Count, Force, Length, Moment

__all__ = [
    "development_maximum_at_support",
    "development_maximum_confined",
    "embedment_at_inflection",
    "embedment_into_support",
    "extension_of_negative_bars",
    "extension_past_section",
    "integrity_bars",
    "integrity_negative",
    "integrity_positive",
    "integrity_positive_inside",
    "negative_area_past_inflection",
    "positive_area_into_simple_support",
    "positive_area_into_support",
]


def _both(number: str) -> tuple[Clause, Clause]:
    return ACI_318_14(number), ACI_318_19(number)


# Extensions and embedments


@formula(*_both("9.7.3.3"))
def extension_past_section(*, d: Length, d_b: Length) -> Length:
    """Extension of a bar past the section that no longer needs it, not at a simple support or a free end.

    >>> extension_past_section(d=21.5, d_b=1.0), extension_past_section(d=10.0, d_b=1.0)
    (21.5, 12.0)
    """
    l_ext = max(d, 12 * d_b)
    return l_ext


@formula(*_both("9.7.3.8.4"))
def extension_of_negative_bars(*, d: Length, d_b: Length, l_n: Length) -> Length:
    """Extension past the point of inflection of a third of the bars of the negative moment."""
    l_ext = max(d, 12 * d_b, l_n / 16)
    return l_ext


@formula(*_both("9.7.3.8.1"))
def embedment_into_support() -> Length:
    """Least length of positive-moment bars into a support; 9.7.3.8.2 asks for the same at other supports."""
    l_embed = 6 * inch
    return l_embed


@formula(*_both("9.7.3.8.3"))
def embedment_at_inflection(*, d: Length, d_b: Length) -> Length:
    """Largest embedment past a point of inflection that counts."""
    l_a_max = max(d, 12 * d_b)
    return l_a_max


@formula(*_both("9.7.3.8.3(b)"))
def development_maximum_at_support(*, M_n: Moment, V_u: Force, l_a: Length) -> Length:
    """Largest development length of positive-moment bars at a simple support or an inflection, end not confined.

    >>> development_maximum_at_support(M_n=2_400_000.0, V_u=80_000.0, l_a=6.0)
    36.0
    """
    l_d_max = M_n / V_u + l_a
    return l_d_max


@formula(*_both("9.7.3.8.3(a)"))
def development_maximum_confined(*, M_n: Moment, V_u: Force, l_a: Length) -> Length:
    """Largest development length of positive-moment bars whose ends a compressive reaction confines."""
    l_d_max = 1.3 * M_n / V_u + l_a
    return l_d_max


# Areas that continue


@formula(*_both("9.7.3.8.1"))
def positive_area_into_simple_support(*, A_s_pos: Area) -> Area:
    """Least area of positive-moment bars that runs into a simple support."""
    A_s_cont = A_s_pos / 3
    return A_s_cont


@formula(*_both("9.7.3.8.2"))
def positive_area_into_support(*, A_s_pos: Area) -> Area:
    """Least area of positive-moment bars that runs into a support other than a simple one."""
    A_s_cont = A_s_pos / 4
    return A_s_cont


@formula(*_both("9.7.3.8.4"))
def negative_area_past_inflection(*, A_s_neg: Area) -> Area:
    """Least area of negative-moment bars that runs past the point of inflection."""
    A_s_cont = A_s_neg / 3
    return A_s_cont


# Structural integrity


@formula(*_both("9.7.7.1(a)"))
def integrity_positive(*, A_s_pos: Area) -> Area:
    """Least area of positive-moment bars that is continuous in a perimeter beam."""
    A_s_cont = A_s_pos / 4
    return A_s_cont


@formula(*_both("9.7.7.1(b)"))
def integrity_negative(*, A_s_neg: Area) -> Area:
    """Least area of negative-moment bars that is continuous in a perimeter beam."""
    A_s_cont = A_s_neg / 6
    return A_s_cont


@formula(*_both("9.7.7.1"))
def integrity_bars() -> Count:
    """Least number of continuous bars, at the top and at the bottom each."""
    n_min = 2.0
    return n_min


integrity_positive_inside = cited_in(integrity_positive, *_both("9.7.7.2(a)"))
