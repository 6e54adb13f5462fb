"""Factors on development lengths, each chosen by its own rule.

Where a schedule states only yes or no, the rule is two functions, one for each answer: the caller picks one, and says
why. A rule that stands in several tables exists once; `cited_in` gives it the clause of the other table.
"""

from __future__ import annotations

from calcpack.aci318.standards import ACI_318_14, ACI_318_19
from calcpack.formula import Clause, Formula, formula, inch, psi
from calcpack.units import Area, Length, Ratio, Stress

__all__ = [
    "bar_size",
    "casting_position",
    "cited_in",
    "coated_bar",
    "coated_bar_by_c_b",
    "coated_bar_unknown",
    "coated_head",
    "coated_hook",
    "concrete_strength",
    "concrete_strength_heads",
    "confined_heads",
    "confined_hooks",
    "head_in_core",
    "head_location_unknown",
    "head_outside_core",
    "hook_cover_90",
    "hook_cover_180",
    "hook_cover_unknown",
    "hook_in_ties",
    "hook_without_ties",
    "location_in_core",
    "location_outside_core",
    "location_unknown",
    "other_bar",
    "reinforcement_grade",
    "spaced_heads",
    "spaced_hooks",
    "ties_at_heads",
    "ties_at_hooks",
    "ties_in_compression",
    "top_bar",
    "uncoated",
    "uncoated_head",
    "uncoated_hook",
    "unconfined",
    "unconfined_heads",
    "without_ties_in_compression",
]

_STRAIGHT = (ACI_318_14("Table 25.4.2.4"), ACI_318_19("Table 25.4.2.5"))
_HOOK_14 = ACI_318_14("Table 25.4.3.2")
_HOOK_19 = ACI_318_19("Table 25.4.3.2")
_HEAD_19 = ACI_318_19("Table 25.4.4.3")
_HEAD = (ACI_318_14("25.4.4.2"), _HEAD_19)
_COMPRESSION = (ACI_318_14("Table 25.4.9.3"), ACI_318_19("Table 25.4.9.3"))


def cited_in(rule: Formula, *clauses: Clause) -> Formula:
    """The same rule where it stands in another table."""
    return Formula(rule.function, clauses, rule.empirical, rule.limits)


@formula(*_STRAIGHT)
def casting_position(*, h_below: Length) -> Ratio:
    """Casting factor of a horizontal bar from the depth of fresh concrete below it.

    >>> casting_position(h_below=12.0), casting_position(h_below=12.5)
    (1.0, 1.3)
    """
    if h_below > 12 * inch:
        psi_t = 1.3
    else:
        psi_t = 1.0
    return psi_t


@formula(*_STRAIGHT)
def top_bar() -> Ratio:
    """Casting factor where the schedule says that more than 12 in of concrete is cast below the bar."""
    psi_t = 1.3
    return psi_t


@formula(*_STRAIGHT)
def other_bar() -> Ratio:
    """Casting factor where the schedule says that the bar is not a top bar."""
    psi_t = 1.0
    return psi_t


@formula(*_STRAIGHT)
def uncoated() -> Ratio:
    """Coating factor of uncoated and of zinc-coated bars."""
    psi_e = 1.0
    return psi_e


@formula(*_STRAIGHT)
def coated_bar(*, c_c: Length, s_clear: Length, d_b: Length) -> Ratio:
    """Coating factor of straight epoxy-coated or dual-coated bars.

    >>> coated_bar(c_c=3.0, s_clear=6.0, d_b=1.0), coated_bar(c_c=2.9, s_clear=6.0, d_b=1.0)
    (1.2, 1.5)
    """
    if c_c < 3 * d_b or s_clear < 6 * d_b:
        psi_e = 1.5
    else:
        psi_e = 1.2
    return psi_e


# c_b is the lesser of c_c + d_b/2 and (s_clear + d_b)/2: below 3.5 d_b exactly when one of the two conditions holds.
@formula(*_STRAIGHT)
def coated_bar_by_c_b(*, c_b: Length, d_b: Length) -> Ratio:
    """Coating factor of straight epoxy-coated or dual-coated bars, where cover and spacing are not stated."""
    if c_b < 3.5 * d_b:
        psi_e = 1.5
    else:
        psi_e = 1.2
    return psi_e


@formula(*_STRAIGHT)
def coated_bar_unknown() -> Ratio:
    """Coating factor of straight epoxy-coated or dual-coated bars, cover or spacing not known: the larger one."""
    psi_e = 1.5
    return psi_e


@formula(_HOOK_14, _HOOK_19)
def coated_hook() -> Ratio:
    """Coating factor of hooked or headed bars with epoxy or dual coating."""
    psi_e = 1.2
    return psi_e


@formula(*_STRAIGHT)
def bar_size(*, d_b: Length) -> Ratio:
    """Size factor, below 1 for No. 6 and smaller."""
    if d_b <= 0.75 * inch:
        psi_s = 0.8
    else:
        psi_s = 1.0
    return psi_s


# The table lists grades 60, 80 and 100; a strength between two of them takes the factor of the higher one.
@formula(ACI_318_19("Table 25.4.2.5"))
def reinforcement_grade(*, f_y: Stress) -> Ratio:
    """Grade factor.

    >>> [reinforcement_grade(f_y=f_y) for f_y in (60_000.0, 80_000.0, 100_000.0)]
    [1.0, 1.15, 1.3]
    """
    if f_y <= 60000 * psi:
        psi_g = 1.0
    elif f_y <= 80000 * psi:
        psi_g = 1.15
    else:
        psi_g = 1.3
    return psi_g


@formula(_HOOK_14)
def hook_cover_90(*, d_b: Length, c_side: Length, c_tail: Length) -> Ratio:
    """Cover factor of a 90-degree hook, No. 11 and smaller."""
    if d_b <= 1.41 * inch and c_side >= 2.5 * inch and c_tail >= 2 * inch:
        psi_c = 0.7
    else:
        psi_c = 1.0
    return psi_c


@formula(_HOOK_14)
def hook_cover_180(*, d_b: Length, c_side: Length) -> Ratio:
    """Cover factor of a 180-degree hook, No. 11 and smaller."""
    if d_b <= 1.41 * inch and c_side >= 2.5 * inch:
        psi_c = 0.7
    else:
        psi_c = 1.0
    return psi_c


@formula(_HOOK_14)
def hook_cover_unknown() -> Ratio:
    """Cover factor of a hook whose covers are not stated."""
    psi_c = 1.0
    return psi_c


@formula(_HOOK_14)
def hook_in_ties(*, d_b: Length) -> Ratio:
    """Confinement factor of a hook, No. 11 and smaller, in ties or stirrups at three bar diameters or closer."""
    if d_b <= 1.41 * inch:
        psi_r = 0.8
    else:
        psi_r = 1.0
    return psi_r


@formula(_HOOK_14)
def hook_without_ties() -> Ratio:
    """Confinement factor of a hook without such ties."""
    psi_r = 1.0
    return psi_r


@formula(_HOOK_19)
def confined_hooks(*, d_b: Length, A_th: Area, A_hs: Area, s: Length) -> Ratio:
    """Confinement factor of hooks from the ties provided and the spacing of the hooked bars."""
    if d_b <= 1.41 * inch and (A_th >= 0.4 * A_hs or s >= 6 * d_b):
        psi_r = 1.0
    else:
        psi_r = 1.6
    return psi_r


@formula(_HOOK_19)
def ties_at_hooks(*, d_b: Length) -> Ratio:
    """Confinement factor of hooks whose ties are scheduled as 0.4 of the bar area or more."""
    if d_b <= 1.41 * inch:
        psi_r = 1.0
    else:
        psi_r = 1.6
    return psi_r


@formula(_HOOK_19)
def spaced_hooks(*, d_b: Length, s: Length) -> Ratio:
    """Confinement factor of hooks by the spacing of the hooked bars alone."""
    if d_b <= 1.41 * inch and s >= 6 * d_b:
        psi_r = 1.0
    else:
        psi_r = 1.6
    return psi_r


@formula(_HOOK_19)
def unconfined() -> Ratio:
    """Confinement factor of hooks with neither ties nor wide spacing."""
    psi_r = 1.6
    return psi_r


@formula(_HOOK_19)
def location_in_core(*, d_b: Length, c_side: Length) -> Ratio:
    """Location factor of a hook or head that ends inside a column core."""
    if d_b <= 1.41 * inch and c_side >= min(2.5 * inch, 6 * d_b):
        psi_o = 1.0
    else:
        psi_o = 1.25
    return psi_o


@formula(_HOOK_19)
def location_outside_core(*, d_b: Length, c_side: Length) -> Ratio:
    """Location factor of a hook or head outside a column core."""
    if d_b <= 1.41 * inch and c_side >= 6 * d_b:
        psi_o = 1.0
    else:
        psi_o = 1.25
    return psi_o


@formula(_HOOK_19)
def location_unknown() -> Ratio:
    """Location factor of a hook or head whose side cover is not stated."""
    psi_o = 1.25
    return psi_o


@formula(_HOOK_19)
def concrete_strength(*, f_c: Stress) -> Ratio:
    """Strength factor of hooks and heads.

    >>> round(concrete_strength(f_c=4_000.0), 4), concrete_strength(f_c=6_000.0)
    (0.8667, 1.0)
    """
    if f_c < 6000 * psi:
        psi_c = f_c / (15000 * psi) + 0.6
    else:
        psi_c = 1.0
    return psi_c


@formula(_HEAD_19)
def confined_heads(*, d_b: Length, A_tt: Area, A_hs: Area, s: Length) -> Ratio:
    """Parallel-tie factor of heads from the ties provided and the spacing of the headed bars."""
    if d_b <= 1.41 * inch and (A_tt >= 0.3 * A_hs or s >= 6 * d_b):
        psi_p = 1.0
    else:
        psi_p = 1.6
    return psi_p


@formula(_HEAD_19)
def ties_at_heads(*, d_b: Length) -> Ratio:
    """Parallel-tie factor of heads whose parallel ties are scheduled as 0.3 of the bar area or more."""
    if d_b <= 1.41 * inch:
        psi_p = 1.0
    else:
        psi_p = 1.6
    return psi_p


@formula(_HEAD_19)
def spaced_heads(*, d_b: Length, s: Length) -> Ratio:
    """Parallel-tie factor of heads by the spacing of the headed bars alone."""
    if d_b <= 1.41 * inch and s >= 6 * d_b:
        psi_p = 1.0
    else:
        psi_p = 1.6
    return psi_p


@formula(_HEAD_19)
def unconfined_heads() -> Ratio:
    """Parallel-tie factor of heads with neither ties nor wide spacing."""
    psi_p = 1.6
    return psi_p


@formula(*_COMPRESSION)
def ties_in_compression() -> Ratio:
    """Confinement factor in compression inside a spiral or close ties."""
    psi_r = 0.75
    return psi_r


@formula(*_COMPRESSION)
def without_ties_in_compression() -> Ratio:
    """Confinement factor in compression without such confinement."""
    psi_r = 1.0
    return psi_r


uncoated_hook = cited_in(uncoated, _HOOK_14, _HOOK_19)
uncoated_head = cited_in(uncoated, *_HEAD)
coated_head = cited_in(coated_hook, *_HEAD)
head_in_core = cited_in(location_in_core, _HEAD_19)
head_outside_core = cited_in(location_outside_core, _HEAD_19)
head_location_unknown = cited_in(location_unknown, _HEAD_19)
concrete_strength_heads = cited_in(concrete_strength, _HEAD_19)
