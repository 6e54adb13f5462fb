"""Standard hooks: development in tension, ACI 318 25.4.3, and geometry, Tables 25.3.1 and 25.3.2.

The casting position factor does not apply to hooks.
"""

from __future__ import annotations

from math import sqrt

from calcpack.aci318.limits import (
    BAR_DIAMETER,
    BAR_DIAMETER_TO_NO_11,
    CONCRETE,
    LIGHTWEIGHT,
    YIELD_80,
    YIELD_100,
    YIELD_LEAST,
)
from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Limit, formula, inch
from calcpack.units import Area, Length, Ratio, Stress

__all__ = [
    "bend_diameter",
    "extension_90",
    "extension_180",
    "hook_14",
    "hook_19",
    "hook_minimum",
    "hook_reduced",
    "hook_special_frame",
    "joint_hook",
    "joint_hook_uncoated",
    "joint_straight",
    "joint_straight_outside_core",
    "joint_straight_top",
    "tie_bend_diameter",
    "tie_extension_90",
    "tie_extension_135",
]

_HOOK = (ACI_318_14("Table 25.3.1"), ACI_318_19("Table 25.3.1"))
_TIE = (ACI_318_14("Table 25.3.2"), ACI_318_19("Table 25.3.2"))
_TIE_BAR = Limit("d_b", "No. 8 and smaller, ACI 318 Table 25.3.2", values=(0.375, 0.5, 0.625, 0.75, 0.875, 1.0))


@formula(
    ACI_318_14("25.4.3.1(a)"),
    empirical=True,
    limits=(CONCRETE, YIELD_LEAST, YIELD_80, LIGHTWEIGHT, BAR_DIAMETER),
)
def hook_14(*, f_y: Stress, f_c: Stress, lamb: Ratio, psi_e: Ratio, psi_c: Ratio, psi_r: Ratio, d_b: Length) -> Length:
    """Development length of a standard hook by the equation, before its minima."""
    root_f_c = min(sqrt(f_c), 100.0)
    l_dh_a = f_y * psi_e * psi_c * psi_r / (50 * lamb * root_f_c) * d_b
    return l_dh_a


@formula(
    ACI_318_19("25.4.3.1(a)"),
    empirical=True,
    limits=(CONCRETE, YIELD_LEAST, YIELD_100, LIGHTWEIGHT, BAR_DIAMETER),
)
def hook_19(
    *, f_y: Stress, f_c: Stress, lamb: Ratio, psi_e: Ratio, psi_r: Ratio, psi_o: Ratio, psi_c: Ratio, d_b: Length
) -> Length:
    """Development length of a standard hook by the equation, before its minima."""
    root_f_c = min(sqrt(f_c), 100.0)
    l_dh_a: Length = f_y * psi_e * psi_r * psi_o * psi_c / (55 * lamb * root_f_c) * d_b**1.5
    return l_dh_a


@formula(ACI_318_14("25.4.3.1"), ACI_318_19("25.4.3.1"))
def hook_minimum(*, l_dh_a: Length, d_b: Length) -> Length:
    """Development length of a standard hook, not less than 8 bar diameters and 6 in."""
    l_dh = max(l_dh_a, 8 * d_b, 6 * inch)
    return l_dh


@formula(ACI_318_14("25.4.10.1"))
def hook_reduced(*, l_dh_a: Length, A_s_required: Area, A_s_provided: Area, d_b: Length) -> Length:
    """Development length of a standard hook, reduced for excess reinforcement, minima kept."""
    l_dh = max(l_dh_a * A_s_required / A_s_provided, 8 * d_b, 6 * inch)
    return l_dh


@formula(
    ACI_318_14("18.8.5.1"),
    ACI_318_19("18.8.5.1"),
    empirical=True,
    limits=(CONCRETE, YIELD_LEAST, YIELD_100, LIGHTWEIGHT, BAR_DIAMETER_TO_NO_11),
)
def hook_special_frame(*, f_y: Stress, f_c: Stress, lamb: Ratio, d_b: Length) -> Length:
    """Development length of a 90-degree hook inside the confined core of a special moment frame joint."""
    root_f_c = min(sqrt(f_c), 100.0)
    l_dh = max(f_y * d_b / (65 * lamb * root_f_c), 8 * d_b, 6 * inch)
    return l_dh


# The same length with the minima that the clause has for lightweight concrete, for coated bars and straight ones.
@formula(
    ACI_318_14("18.8.5.1"),
    ACI_318_19("18.8.5.1"),
    empirical=True,
    limits=(CONCRETE, YIELD_LEAST, YIELD_100, LIGHTWEIGHT, BAR_DIAMETER_TO_NO_11),
)
def joint_hook_uncoated(*, f_y: Stress, f_c: Stress, lamb: Ratio, d_b: Length) -> Length:
    """Development length of an uncoated hook inside the core of a joint of a special moment frame."""
    root_f_c = min(sqrt(f_c), 100.0)
    if lamb < 1.0:
        l_dh_j = max(f_y * d_b / (65 * lamb * root_f_c), 10 * d_b, 7.5 * inch)
    else:
        l_dh_j = max(f_y * d_b / (65 * lamb * root_f_c), 8 * d_b, 6 * inch)
    return l_dh_j


@formula(ACI_318_14("18.8.5.1"), ACI_318_19("18.8.5.1"))
def joint_hook(*, l_dh_j: Length, psi_e: Ratio) -> Length:
    """Development length of a hook in a joint of a special moment frame, with its coating factor (18.8.5.5)."""
    l_dh = psi_e * l_dh_j
    return l_dh


@formula(ACI_318_14("18.8.5.3(a)"), ACI_318_19("18.8.5.3(a)"))
def joint_straight(*, l_dh_j: Length, psi_e: Ratio) -> Length:
    """Development length of a straight bar in such a joint, 12 in of concrete or less cast below it."""
    l_d = 2.5 * psi_e * l_dh_j
    return l_d


@formula(ACI_318_14("18.8.5.3(b)"), ACI_318_19("18.8.5.3(b)"))
def joint_straight_top(*, l_dh_j: Length, psi_e: Ratio) -> Length:
    """Development length of a straight bar in such a joint, more than 12 in of concrete cast below it."""
    l_d = 3.25 * psi_e * l_dh_j
    return l_d


# What lies outside the core counts less: each inch inside is worth 1.6 in outside.
@formula(ACI_318_14("18.8.5.4"), ACI_318_19("18.8.5.4"))
def joint_straight_outside_core(*, l_d: Length, l_core: Length) -> Length:
    """Development length of a straight bar of which only the length `l_core` lies in the confined core."""
    l_dm = 1.6 * (l_d - l_core) + l_core
    return l_dm


@formula(*_HOOK, limits=(BAR_DIAMETER,))
def bend_diameter(*, d_b: Length) -> Length:
    """Least inside bend diameter of a standard hook.

    >>> bend_diameter(d_b=1.0), bend_diameter(d_b=1.128)
    (6.0, 9.024)
    """
    if d_b <= 1.0 * inch:
        D_bend = 6 * d_b
    elif d_b <= 1.41 * inch:
        D_bend = 8 * d_b
    else:
        D_bend = 10 * d_b
    return D_bend


@formula(*_HOOK, limits=(BAR_DIAMETER,))
def extension_90(*, d_b: Length) -> Length:
    """Straight extension of a standard 90-degree hook."""
    l_ext = 12 * d_b
    return l_ext


@formula(*_HOOK, limits=(BAR_DIAMETER,))
def extension_180(*, d_b: Length) -> Length:
    """Straight extension of a standard 180-degree hook."""
    l_ext = max(4 * d_b, 2.5 * inch)
    return l_ext


@formula(*_TIE, limits=(_TIE_BAR,))
def tie_bend_diameter(*, d_b: Length) -> Length:
    """Least inside bend diameter of a tie or stirrup hook."""
    if d_b <= 0.625 * inch:
        D_bend = 4 * d_b
    else:
        D_bend = 6 * d_b
    return D_bend


@formula(*_TIE, limits=(_TIE_BAR,))
def tie_extension_90(*, d_b: Length) -> Length:
    """Straight extension of a 90-degree tie or stirrup hook."""
    if d_b <= 0.625 * inch:
        l_ext = max(6 * d_b, 3 * inch)
    else:
        l_ext = 12 * d_b
    return l_ext


@formula(*_TIE, limits=(_TIE_BAR,))
def tie_extension_135(*, d_b: Length) -> Length:
    """Straight extension of a 135-degree tie or stirrup hook."""
    l_ext = max(6 * d_b, 3 * inch)
    return l_ext
