"""Bundled bars, ACI 318 25.6.1: a bar of a bundle is developed by itself, and its length increased.

For cover, spacing, confinement and coating a bundle counts as one bar of the same area, of the diameter `d_be`; the
length follows the diameter `d_b` of the single bar. A length of the single bar has the index 1.
"""

from __future__ import annotations

from math import pi, sqrt

from calcpack.aci318.limits import BAR_DIAMETER, CONCRETE, LIGHTWEIGHT, YIELD_80, YIELD_100, YIELD_LEAST
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, Limit, formula, inch
from calcpack.units import Area, Count, Length, Ratio, Stress

__all__ = [
    "bundle_factor",
    "bundled_compression",
    "bundled_compression_reduced",
    "bundled_lap_class_a",
    "bundled_lap_class_b",
    "bundled_lap_compression",
    "bundled_lap_in_spiral",
    "bundled_lap_in_ties",
    "bundled_tension",
    "bundled_tension_reduced",
    "coated_bundle",
    "coated_bundle_by_c_b",
    "equivalent_diameter",
    "general_tension_of_bundle_14",
    "general_tension_of_bundle_19",
]


def _both(number: str) -> tuple[Clause, Clause]:
    return ACI_318_14(number), ACI_318_19(number)


_LONGER = _both("25.6.1.5")
_LAPPED = _both("25.6.1.7")
_AS_ONE = _both("25.6.1.6")
_BARS = Limit("n_bundle", "ACI 318-14 and 318-19 25.6.1.1", values=(1.0, 2.0, 3.0, 4.0))
_LIMITS_14 = (CONCRETE, YIELD_LEAST, YIELD_80, LIGHTWEIGHT, BAR_DIAMETER)
_LIMITS_19 = (CONCRETE, YIELD_LEAST, YIELD_100, LIGHTWEIGHT, BAR_DIAMETER)


@formula(*_AS_ONE, limits=(_BARS,))
def equivalent_diameter(*, A_b: Area, n_bundle: Count) -> Length:
    """Diameter of one bar of the area of the bundle.

    >>> round(equivalent_diameter(A_b=0.79, n_bundle=4.0), 3)
    2.006
    """
    d_be = sqrt(4 * n_bundle * A_b / pi)
    return d_be


@formula(*_LONGER, limits=(_BARS,))
def bundle_factor(*, n_bundle: Count) -> Ratio:
    """Factor on the length of a bar of a bundle: a fifth more in bundles of three, a third more in those of four.

    >>> [bundle_factor(n_bundle=float(n)) for n in (1, 2, 3, 4)]
    [1.0, 1.0, 1.2, 1.33]
    """
    if n_bundle <= 2:
        k_bundle = 1.0
    elif n_bundle <= 3:
        k_bundle = 1.2
    else:
        k_bundle = 1.33
    return k_bundle


@formula(*_AS_ONE)
def coated_bundle(*, c_c: Length, s_clear: Length, d_be: Length) -> Ratio:
    """Coating factor of bundled straight bars with epoxy or dual coating."""
    if c_c < 3 * d_be or s_clear < 6 * d_be:
        psi_e = 1.5
    else:
        psi_e = 1.2
    return psi_e


@formula(*_AS_ONE)
def coated_bundle_by_c_b(*, c_b: Length, d_be: Length) -> Ratio:
    """Coating factor of bundled straight bars with epoxy or dual coating, where cover and spacing are not stated."""
    if c_b < 3.5 * d_be:
        psi_e = 1.5
    else:
        psi_e = 1.2
    return psi_e


@formula(ACI_318_14("25.4.2.3a"), empirical=True, limits=_LIMITS_14)
def general_tension_of_bundle_14(
    *,
    f_y: Stress,
    f_c: Stress,
    lamb: Ratio,
    psi_t: Ratio,
    psi_e: Ratio,
    psi_s: Ratio,
    c_b: Length,
    K_tr: Length,
    d_be: Length,
    d_b: Length,
) -> Length:
    """Development length in tension by the general equation, confinement by the bundle, before the minimum."""
    psi_te = min(psi_t * psi_e, 1.7)
    confinement = min((c_b + K_tr) / d_be, 2.5)
    root_f_c = min(sqrt(f_c), 100.0)
    l_d_a = 3 / 40 * f_y / (lamb * root_f_c) * psi_te * psi_s / confinement * d_b
    return l_d_a


@formula(ACI_318_19("25.4.2.4a"), empirical=True, limits=_LIMITS_19)
def general_tension_of_bundle_19(
    *,
    f_y: Stress,
    f_c: Stress,
    lamb: Ratio,
    psi_t: Ratio,
    psi_e: Ratio,
    psi_s: Ratio,
    psi_g: Ratio,
    c_b: Length,
    K_tr: Length,
    d_be: Length,
    d_b: Length,
) -> Length:
    """Development length in tension by the general equation, confinement by the bundle, before the minimum."""
    psi_te = min(psi_t * psi_e, 1.7)
    confinement = min((c_b + K_tr) / d_be, 2.5)
    root_f_c = min(sqrt(f_c), 100.0)
    l_d_a = 3 / 40 * f_y / (lamb * root_f_c) * psi_te * psi_s * psi_g / confinement * d_b
    return l_d_a


# The increase is on the length that the single bar would need, so the minimum is increased as well.
@formula(*_LONGER)
def bundled_tension(*, l_d_a: Length, k_bundle: Ratio) -> Length:
    """Development length in tension of a bar of a bundle."""
    l_d_1 = max(l_d_a, 12 * inch)
    l_d = k_bundle * l_d_1
    return l_d


@formula(*_LONGER)
def bundled_tension_reduced(*, l_d_a: Length, A_s_required: Area, A_s_provided: Area, k_bundle: Ratio) -> Length:
    """Development length in tension of a bar of a bundle, reduced for excess reinforcement."""
    l_d_1 = max(l_d_a * A_s_required / A_s_provided, 12 * inch)
    l_d = k_bundle * l_d_1
    return l_d


@formula(*_LONGER)
def bundled_compression(*, l_dc_a: Length, k_bundle: Ratio) -> Length:
    """Development length in compression of a bar of a bundle."""
    l_dc_1 = max(l_dc_a, 8 * inch)
    l_dc = k_bundle * l_dc_1
    return l_dc


@formula(*_LONGER)
def bundled_compression_reduced(*, l_dc_a: Length, A_s_required: Area, A_s_provided: Area, k_bundle: Ratio) -> Length:
    """Development length in compression of a bar of a bundle, reduced for excess reinforcement."""
    l_dc_1 = max(l_dc_a * A_s_required / A_s_provided, 8 * inch)
    l_dc = k_bundle * l_dc_1
    return l_dc


@formula(*_LAPPED)
def bundled_lap_class_a(*, l_d_a: Length, k_bundle: Ratio) -> Length:
    """Tension lap of one bar within a bundle, class A."""
    l_st_1 = max(1.0 * l_d_a, 12 * inch)
    l_st = k_bundle * l_st_1
    return l_st


@formula(*_LAPPED)
def bundled_lap_class_b(*, l_d_a: Length, k_bundle: Ratio) -> Length:
    """Tension lap of one bar within a bundle, class B."""
    l_st_1 = max(1.3 * l_d_a, 12 * inch)
    l_st = k_bundle * l_st_1
    return l_st


@formula(*_LAPPED)
def bundled_lap_compression(*, l_sc_a: Length, k_bundle: Ratio) -> Length:
    """Compression lap of one bar within a bundle, outside a column's ties or spiral."""
    l_sc = k_bundle * l_sc_a
    return l_sc


@formula(*_LAPPED)
def bundled_lap_in_ties(*, l_sc_a: Length, k_bundle: Ratio) -> Length:
    """Compression lap of one bar within a bundle, in column ties of 0.0015 h s or more in both directions."""
    l_sc_1 = max(0.83 * l_sc_a, 12 * inch)
    l_sc = k_bundle * l_sc_1
    return l_sc


@formula(*_LAPPED)
def bundled_lap_in_spiral(*, l_sc_a: Length, k_bundle: Ratio) -> Length:
    """Compression lap of one bar within a bundle, inside a column spiral."""
    l_sc_1 = max(0.75 * l_sc_a, 12 * inch)
    l_sc = k_bundle * l_sc_1
    return l_sc
