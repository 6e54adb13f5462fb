"""Development of straight deformed bars in tension, ACI 318 25.4.2.

A length before the minimum is ``l_d_a``, item (a) of 25.4.2.1; with the minimum it is ``l_d``.
"""

from __future__ import annotations

from math import sqrt

from calcpack.aci318.limits import BAR_DIAMETER, CONCRETE, LIGHTWEIGHT, YIELD_80, YIELD_100, YIELD_LEAST
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, formula, inch
from calcpack.units import Area, Count, Length, Ratio, Stress

__all__ = [
    "c_b_by_cover",
    "c_b_by_spacing",
    "centre_spacing",
    "close_bars",
    "cover_or_spacing",
    "straight_tension_14",
    "straight_tension_19",
    "straight_tension_minimum",
    "straight_tension_other_14",
    "straight_tension_other_19",
    "straight_tension_reduced",
    "straight_tension_spaced_14",
    "straight_tension_spaced_19",
    "transverse_index",
    "transverse_index_minimum",
]

_LIMITS_14 = (CONCRETE, YIELD_LEAST, YIELD_80, LIGHTWEIGHT, BAR_DIAMETER)
_LIMITS_19 = (CONCRETE, YIELD_LEAST, YIELD_100, LIGHTWEIGHT, BAR_DIAMETER)


# c_b is defined in the notation, chapter 2: to the bar centre, and half the centre-to-centre spacing.
@formula(ACI_318_14("2.2"), ACI_318_19("2.2"))
def cover_or_spacing(*, c_c: Length, s_clear: Length, d_b: Length) -> Length:
    """The smaller of the cover to the bar centre and half the bar spacing."""
    c_b = min(c_c + d_b / 2, s_clear / 2 + d_b / 2)
    return c_b


@formula(Clause("geometry of the section"))
def centre_spacing(*, s_clear: Length, d_b: Length) -> Length:
    """Centre-to-centre spacing of bars, from their clear spacing."""
    s = s_clear + d_b
    return s


# One per cent above the definition, for dimensions rounded on the drawing.
@formula(ACI_318_14("2.2"), ACI_318_19("2.2"))
def c_b_by_cover(*, c_c: Length, d_b: Length) -> Length:
    """Largest distance to the bar centre within the clear cover, with one per cent for rounded dimensions."""
    c_b_max = 1.01 * (c_c + d_b / 2)
    return c_b_max


@formula(ACI_318_14("2.2"), ACI_318_19("2.2"))
def c_b_by_spacing(*, s: Length) -> Length:
    """Largest distance to the bar centre within half the bar spacing, with one per cent for rounded dimensions."""
    c_b_max = 1.01 * s / 2
    return c_b_max


# n counts the bars being developed or spliced along the plane of splitting, not every bar of the section.
@formula(ACI_318_14("25.4.2.3b"), ACI_318_19("25.4.2.4b"))
def transverse_index(*, A_tr: Area, s: Length, n: Count) -> Length:
    """Transverse reinforcement index.

    >>> round(transverse_index(A_tr=0.22, s=8.0, n=4), 3)
    0.275
    """
    K_tr = 40 * A_tr / (s * n)
    return K_tr


@formula(ACI_318_19("25.4.2.2"))
def close_bars() -> Length:
    """Spacing below which bars of Grade 80 and above need transverse reinforcement."""
    s_min = 6 * inch
    return s_min


@formula(ACI_318_19("25.4.2.2"))
def transverse_index_minimum(*, d_b: Length) -> Length:
    """Least transverse reinforcement index of close bars of Grade 80 and above."""
    K_tr_min = 0.5 * d_b
    return K_tr_min


@formula(ACI_318_14("25.4.2.3a"), empirical=True, limits=_LIMITS_14)
def straight_tension_14(
    *,
    f_y: Stress,
    f_c: Stress,
    lamb: Ratio,
    psi_t: Ratio,
    psi_e: Ratio,
    psi_s: Ratio,
    c_b: Length,
    K_tr: Length,
    d_b: Length,
) -> Length:
    """Development length in tension by the general equation, before the minimum."""
    psi_te = min(psi_t * psi_e, 1.7)
    confinement = min((c_b + K_tr) / d_b, 2.5)
    root_f_c = min(sqrt(f_c), 100.0)
    l_d_a = 3 / 40 * f_y / (lamb * root_f_c) * psi_te * psi_s / confinement * d_b
    return l_d_a


@formula(ACI_318_19("25.4.2.4a"), empirical=True, limits=_LIMITS_19)
def straight_tension_19(
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
    d_b: Length,
) -> Length:
    """Development length in tension by the general equation, before the minimum."""
    psi_te = min(psi_t * psi_e, 1.7)
    confinement = min((c_b + K_tr) / d_b, 2.5)
    root_f_c = min(sqrt(f_c), 100.0)
    l_d_a = 3 / 40 * f_y / (lamb * root_f_c) * psi_te * psi_s * psi_g / confinement * d_b
    return l_d_a


@formula(ACI_318_14("Table 25.4.2.2"), empirical=True, limits=_LIMITS_14)
def straight_tension_spaced_14(
    *, f_y: Stress, f_c: Stress, lamb: Ratio, psi_t: Ratio, psi_e: Ratio, d_b: Length
) -> Length:
    """Development length in tension by the table, cover and spacing conditions met, before the minimum."""
    psi_te = min(psi_t * psi_e, 1.7)
    root_f_c = min(sqrt(f_c), 100.0)
    if d_b <= 0.75 * inch:
        l_d_a = f_y * psi_te / (25 * lamb * root_f_c) * d_b
    else:
        l_d_a = f_y * psi_te / (20 * lamb * root_f_c) * d_b
    return l_d_a


@formula(ACI_318_14("Table 25.4.2.2"), empirical=True, limits=_LIMITS_14)
def straight_tension_other_14(
    *, f_y: Stress, f_c: Stress, lamb: Ratio, psi_t: Ratio, psi_e: Ratio, d_b: Length
) -> Length:
    """Development length in tension by the table, other cases, before the minimum."""
    psi_te = min(psi_t * psi_e, 1.7)
    root_f_c = min(sqrt(f_c), 100.0)
    if d_b <= 0.75 * inch:
        l_d_a = 3 * f_y * psi_te / (50 * lamb * root_f_c) * d_b
    else:
        l_d_a = 3 * f_y * psi_te / (40 * lamb * root_f_c) * d_b
    return l_d_a


@formula(ACI_318_19("Table 25.4.2.3"), empirical=True, limits=_LIMITS_19)
def straight_tension_spaced_19(
    *, f_y: Stress, f_c: Stress, lamb: Ratio, psi_t: Ratio, psi_e: Ratio, psi_g: Ratio, d_b: Length
) -> Length:
    """Development length in tension by the table, cover and spacing conditions met, before the minimum."""
    psi_te = min(psi_t * psi_e, 1.7)
    root_f_c = min(sqrt(f_c), 100.0)
    if d_b <= 0.75 * inch:
        l_d_a = f_y * psi_te * psi_g / (25 * lamb * root_f_c) * d_b
    else:
        l_d_a = f_y * psi_te * psi_g / (20 * lamb * root_f_c) * d_b
    return l_d_a


@formula(ACI_318_19("Table 25.4.2.3"), empirical=True, limits=_LIMITS_19)
def straight_tension_other_19(
    *, f_y: Stress, f_c: Stress, lamb: Ratio, psi_t: Ratio, psi_e: Ratio, psi_g: Ratio, d_b: Length
) -> Length:
    """Development length in tension by the table, other cases, before the minimum."""
    psi_te = min(psi_t * psi_e, 1.7)
    root_f_c = min(sqrt(f_c), 100.0)
    if d_b <= 0.75 * inch:
        l_d_a = 3 * f_y * psi_te * psi_g / (50 * lamb * root_f_c) * d_b
    else:
        l_d_a = 3 * f_y * psi_te * psi_g / (40 * lamb * root_f_c) * d_b
    return l_d_a


@formula(ACI_318_14("25.4.2.1"), ACI_318_19("25.4.2.1"))
def straight_tension_minimum(*, l_d_a: Length) -> Length:
    """Development length in tension, not less than 12 in."""
    l_d = max(l_d_a, 12 * inch)
    return l_d


@formula(ACI_318_14("25.4.10.1"), ACI_318_19("25.4.10.1"))
def straight_tension_reduced(*, l_d_a: Length, A_s_required: Area, A_s_provided: Area) -> Length:
    """Development length in tension, reduced for excess reinforcement, not less than 12 in."""
    l_d = max(l_d_a * A_s_required / A_s_provided, 12 * inch)
    return l_d
