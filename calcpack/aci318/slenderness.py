"""Slenderness of columns by moment magnification, ACI 318 6.2.5, 6.2.6 and 6.6.4.

End moments follow the editions from 2014 on: M_2 is the larger one, never negative; M_1 is negative where both bend the
column in single curvature, so that M_1/M_2 is -1 for equal end moments on the same face.
"""

from __future__ import annotations

from math import pi, tan

from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, Limit, formula, inch
from calcpack.units import Force, Length, Moment, Ratio, Rigidity

__all__ = [
    "alignment_nonsway",
    "alignment_sway",
    "critical_load",
    "end_moment_larger",
    "end_moment_smaller",
    "end_moment_sway",
    "end_moment_sway_whole",
    "least_moment_about_x",
    "least_moment_about_y",
    "magnifier_nonsway",
    "magnifier_sway",
    "magnifier_sway_by_loads",
    "moment_factor",
    "moment_factor_uniform",
    "moment_magnified",
    "moment_reversed",
    "nonsway_part",
    "radius_about_x",
    "radius_about_y",
    "radius_circular",
    "reduced_critical_load",
    "reduced_critical_load_story",
    "second_order_limit",
    "slenderness_limit_nonsway",
    "slenderness_limit_sway",
    "slenderness_limit_uniform",
    "slenderness_ratio",
    "stability_index",
    "stability_index_limit",
    "stability_ratio",
    "stability_ratio_story",
    "sustained_ratio",
]


def _both(number: str) -> tuple[Clause, Clause]:
    return ACI_318_14(number), ACI_318_19(number)


_NEGLECT_SWAY = (ACI_318_14("6.2.5(a)"), ACI_318_19("6.2.5.1(a)"))
_NEGLECT_NONSWAY = (ACI_318_14("6.2.5(b)"), ACI_318_19("6.2.5.1(b)"))
_RADIUS = (ACI_318_14("6.2.5.1(b)"), ACI_318_19("6.2.5.2(b)"))
_END_MOMENTS = _both("2.2")
_BELOW_1 = 1.0 - 2.0**-53
# At 1 and above the column, or the story, buckles: the equation of the magnifier has no meaning there.
_STABLE = Limit("stability", "below 1, ACI 318-14 and 318-19 6.6.4.5.2", low=0.0, high=_BELOW_1)
_STABLE_STORY = Limit("stability_s", "below 1, ACI 318-14 and 318-19 6.6.4.6.2(b)", low=0.0, high=_BELOW_1)
_STABLE_Q = Limit("Q", "below 1, ACI 318-14 and 318-19 6.6.4.6.2(a)", low=0.0, high=_BELOW_1)


# Whether slenderness counts


@formula(*_RADIUS)
def radius_about_x(*, h: Length) -> Length:
    """Radius of gyration of a rectangular column, bending about x."""
    r = 0.30 * h
    return r


@formula(*_RADIUS)
def radius_about_y(*, b: Length) -> Length:
    """Radius of gyration of a rectangular column, bending about y."""
    r = 0.30 * b
    return r


@formula(ACI_318_14("6.2.5.1(c)"), ACI_318_19("6.2.5.2(c)"))
def radius_circular(*, h: Length) -> Length:
    """Radius of gyration of a circular column."""
    r = 0.25 * h
    return r


@formula(ACI_318_14("6.2.5"), ACI_318_19("6.2.5.1"))
def slenderness_ratio(*, k: Ratio, l_u: Length, r: Length) -> Ratio:
    """Slenderness of a column about one axis."""
    slenderness = k * l_u / r
    return slenderness


@formula(*_NEGLECT_SWAY)
def slenderness_limit_sway() -> Ratio:
    """Slenderness up to which it may be neglected, column not braced against sidesway."""
    slenderness_max = 22.0
    return slenderness_max


@formula(*_NEGLECT_NONSWAY)
def slenderness_limit_nonsway(*, M_1: Moment, M_2: Moment) -> Ratio:
    """Slenderness up to which it may be neglected, column braced against sidesway.

    >>> [slenderness_limit_nonsway(M_1=M_1, M_2=100.0) for M_1 in (-100.0, 0.0, 50.0, 100.0)]
    [22.0, 34.0, 40.0, 40.0]
    """
    slenderness_max = min(34 + 12 * M_1 / M_2, 40.0)
    return slenderness_max


@formula(*_NEGLECT_NONSWAY)
def slenderness_limit_uniform() -> Ratio:
    """The same without end moments: any moment is that of an eccentricity equal at both ends, M_1/M_2 = -1."""
    slenderness_max = 34.0 - 12.0
    return slenderness_max


# End moments


@formula(*_END_MOMENTS)
def end_moment_larger(*, M_bottom: Moment, M_top: Moment) -> Moment:
    """The larger end moment, its sign left aside."""
    M_2 = max(abs(M_bottom), abs(M_top))
    return M_2


@formula(*_END_MOMENTS)
def end_moment_smaller(*, M_bottom: Moment, M_top: Moment) -> Moment:
    """The smaller end moment: negative where both compress the same face, which is single curvature.

    >>> end_moment_smaller(M_bottom=-40.0, M_top=-90.0), end_moment_smaller(M_bottom=40.0, M_top=-90.0)
    (-40.0, 40.0)
    """
    if M_bottom * M_top > 0:
        M_1 = -min(abs(M_bottom), abs(M_top))
    else:
        M_1 = min(abs(M_bottom), abs(M_top))
    return M_1


@formula(*_both("6.6.4.6.1"))
def nonsway_part(*, M_u: Moment, M_s: Moment) -> Moment:
    """What of an end moment is not caused by sway."""
    M_ns = M_u - M_s
    return M_ns


@formula(*_both("6.6.4.6.1"))
def end_moment_sway(*, M_ns: Moment, delta_s: Ratio, M_s: Moment) -> Moment:
    """An end moment with its sway part magnified."""
    M_end = M_ns + delta_s * M_s
    return M_end


@formula(*_both("6.6.4.6.1"))
def end_moment_sway_whole(*, delta_s: Ratio, M_u: Moment) -> Moment:
    """An end moment, all of it taken as caused by sway and magnified."""
    M_end = delta_s * M_u
    return M_end


# Magnification along the column


@formula(*_both("6.6.4.4.4"))
def sustained_ratio(*, P_sustained: Force, P_u: Force) -> Ratio:
    """Factored sustained axial force over the factored axial force of the same combination, between 0 and 1."""
    beta_dns = min(max(P_sustained / P_u, 0.0), 1.0)
    return beta_dns


@formula(*_both("6.6.4.4.2"))
def critical_load(*, EI_eff: Rigidity, k: Ratio, l_u: Length) -> Force:
    """Critical buckling load."""
    P_c = pi**2 * EI_eff / (k * l_u) ** 2
    return P_c


@formula(*_both("6.6.4.5.2"))
def reduced_critical_load(*, P_c: Force) -> Force:
    """Critical load with the stiffness reduction factor."""
    P_c_reduced = 0.75 * P_c
    return P_c_reduced


@formula(*_both("6.6.4.5.2"))
def stability_ratio(*, P_u: Force, P_c_reduced: Force) -> Ratio:
    """Axial force over the reduced critical load."""
    stability = P_u / P_c_reduced
    return stability


@formula(*_both("6.6.4.5.3(a)"))
def moment_factor(*, M_1: Moment, M_2: Moment) -> Ratio:
    """Factor that relates the diagram of moments to a uniform one, no loads between the ends."""
    C_m = 0.6 - 0.4 * M_1 / M_2
    return C_m


@formula(*_both("6.6.4.5.4"))
def moment_factor_uniform() -> Ratio:
    """The same where the ends have no moments and the least moment acts."""
    C_m = 1.0
    return C_m


@formula(*_both("6.6.4.5.2"), limits=(_STABLE,))
def magnifier_nonsway(*, C_m: Ratio, stability: Ratio) -> Ratio:
    """Magnifier of moments for curvature between the ends.

    >>> round(magnifier_nonsway(C_m=1.0, stability=500.0 / (0.75 * 1510.0)), 2)
    1.79
    """
    delta_ns = max(C_m / (1 - stability), 1.0)
    return delta_ns


@formula(*_both("6.6.4.5.4"))
def least_moment_about_x(*, P_u: Force, h: Length) -> Moment:
    """Least moment of a slender column about x."""
    M_2_min = P_u * (0.6 * inch + 0.03 * h)
    return M_2_min


@formula(*_both("6.6.4.5.4"))
def least_moment_about_y(*, P_u: Force, b: Length) -> Moment:
    """Least moment of a slender column about y."""
    M_2_min = P_u * (0.6 * inch + 0.03 * b)
    return M_2_min


@formula(*_both("6.6.4.5.1"))
def moment_magnified(*, delta_ns: Ratio, M_2: Moment) -> Moment:
    """Magnified moment, from the larger end moment or from the least moment."""
    M_c = delta_ns * M_2
    return M_c


@formula(*_both("6.6.4.5.1"))
def moment_reversed(*, M_c: Moment) -> Moment:
    """Magnified moment with the sign of the larger end moment, which is negative."""
    M_u = -M_c
    return M_u


@formula(ACI_318_14("6.2.6"), ACI_318_19("6.2.5.3"))
def second_order_limit(*, M_2: Moment, M_2_min: Moment) -> Moment:
    """Largest moment with second-order effects, from the first-order one or the least one."""
    M_c_max = 1.4 * max(M_2, M_2_min)
    return M_c_max


# Sway of a story


@formula(*_both("6.6.4.4.1"))
def stability_index(*, sum_P_u: Force, Delta_o: Length, V_us: Force, l_c: Length) -> Ratio:
    """Stability index of a story.

    >>> stability_index(sum_P_u=1e6, Delta_o=0.5, V_us=40e3, l_c=125.0)
    0.1
    """
    Q = sum_P_u * Delta_o / (V_us * l_c)
    return Q


@formula(*_both("6.6.4.3(b)"))
def stability_index_limit() -> Ratio:
    """Stability index up to which a story is taken as nonsway."""
    Q_max = 0.05
    return Q_max


@formula(*_both("6.6.4.6.2(a)"), limits=(_STABLE_Q,))
def magnifier_sway(*, Q: Ratio) -> Ratio:
    """Magnifier of sway moments from the stability index; good up to 1.5."""
    delta_s = max(1 / (1 - Q), 1.0)
    return delta_s


@formula(*_both("6.6.4.6.2(b)"))
def reduced_critical_load_story(*, sum_P_c: Force) -> Force:
    """Critical load of a story with the stiffness reduction factor."""
    sum_P_c_reduced = 0.75 * sum_P_c
    return sum_P_c_reduced


@formula(*_both("6.6.4.6.2(b)"))
def stability_ratio_story(*, sum_P_u: Force, sum_P_c_reduced: Force) -> Ratio:
    """Vertical load of a story over its reduced critical load."""
    stability_s = sum_P_u / sum_P_c_reduced
    return stability_s


@formula(*_both("6.6.4.6.2(b)"), limits=(_STABLE_STORY,))
def magnifier_sway_by_loads(*, stability_s: Ratio) -> Ratio:
    """Magnifier of sway moments from the vertical loads of the story."""
    delta_s = max(1 / (1 - stability_s), 1.0)
    return delta_s


# The equations of the alignment charts, arranged so that a hand can compare their two sides


@formula(*_both("6.6.4.4.3"))
def alignment_nonsway(*, psi_A: Ratio, psi_B: Ratio, k: Ratio) -> Ratio:
    """Difference of the sides of the alignment-chart equation, braced against sidesway: zero where k is right."""
    psi_m = (psi_A + psi_B) / 2
    k_left = psi_A * psi_B / 4 * (pi / k) ** 2
    k_right = psi_m * (pi / k / tan(pi / k) - 1) + 1 - 2 * k / pi * tan(pi / (2 * k))
    delta_k = (k_left - k_right) / (1 + k_left)
    return delta_k


@formula(*_both("6.6.4.4.3"))
def alignment_sway(*, psi_A: Ratio, psi_B: Ratio, k: Ratio) -> Ratio:
    """Difference of the sides of the alignment-chart equation, free to sway: zero where k is right."""
    k_left = (psi_A * psi_B * (pi / k) ** 2 - 36) / (6 * (psi_A + psi_B))
    k_right = pi / k / tan(pi / k)
    delta_k = (k_left - k_right) / (1 + abs(k_right))
    return delta_k
