"""Which equation or factor serves a row of the anchorage schedule, and the reason that is printed beside it.

Straight bars, hooks, heads and compression; laps and mechanical splices stand in `calcpack.members.anchorage_splices`.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping

from calcpack.aci318 import bundles, compression, development, factors, heads, hooks
from calcpack.aci318.editions import Edition
from calcpack.formula import Formula
from calcpack.members.anchorage_excess import reduces
from calcpack.members.termination import TerminationLike, diameter_of_bundle
from calcpack.members.working import Choice

__all__ = [
    "COMPRESSION_RULES",
    "HEAD_RULES",
    "HOOK_RULES",
    "JOINT_RULES",
    "STRAIGHT_RULES",
    "Rule",
    "bundled",
]


Rule = Callable[[TerminationLike, Edition], Choice | None]


def bundled(row: TerminationLike) -> bool:
    """Whether the bar is one of a bundle whose lengths are increased."""
    return row.bundle > 2


def _serving(edition: Edition, *formulas: Formula) -> Formula:
    """The one of several formulas that stands in the edition."""
    return next(one for one in formulas for clause in one.clauses if clause.standard == edition.standard)


# Straight bars in tension


def _straight_equation(row: TerminationLike, edition: Edition) -> Choice:
    if row.c_b is not None and row.bundle > 1:
        return Choice(_serving(edition, *_GENERAL_OF_BUNDLE), f"General equation: c_b is stated. {_AS_ONE_BAR}")
    if row.c_b is not None:
        return Choice(edition.straight_tension, "General equation: c_b is stated.")
    unstated = [name for name in ("clear cover", "clear spacing") if getattr(row, name.replace(" ", "_")) is None]
    if unstated:
        return Choice(edition.straight_tension_other, f"Table, other cases: {' and '.join(unstated)} not stated.")
    return _straight_table(row, edition)


_GENERAL_OF_BUNDLE = (bundles.general_tension_of_bundle_14, bundles.general_tension_of_bundle_19)
_AS_ONE_BAR = "A bundle counts as one bar of its area (25.6.1.6)."


def _straight_table(row: TerminationLike, edition: Edition) -> Choice:
    d_b, name = diameter_of_bundle(row), "d_b" if row.bundle == 1 else "d_be"
    cover, spacing = row.clear_cover or 0.0, row.clear_spacing or 0.0
    ratios = f"{cover / d_b:.2f} {name}", f"{spacing / d_b:.2f} {name}"
    facts = f"clear cover {cover:g} in = {ratios[0]}, clear spacing {spacing:g} in = {ratios[1]}"
    if cover >= d_b and spacing >= 2 * d_b:
        return Choice(edition.straight_tension_spaced, f"Table, first row: {facts}; at least {name} and 2 {name}.")
    if cover >= d_b and spacing >= d_b and row.confining_ties:
        reason = f"Table, first row: {facts}; at least {name} each, with the least ties or stirrups along the bar."
        return Choice(edition.straight_tension_spaced, reason)
    return Choice(edition.straight_tension_other, f"Table, other cases: {facts}.")


def _straight_length(row: TerminationLike, edition: Edition) -> Choice:
    if bundled(row):
        if reduces(row, edition):
            return Choice(bundles.bundled_tension_reduced, _EXCESS)
        return Choice(bundles.bundled_tension)
    if reduces(row, edition):
        return Choice(development.straight_tension_reduced, _EXCESS)
    return Choice(development.straight_tension_minimum)


_EXCESS = (
    "Reduced for excess reinforcement; none of the exclusions of 25.4.10.2 applies, as the schedule states the areas."
)


def _casting(row: TerminationLike, _edition: Edition) -> Choice:
    if row.top:
        return Choice(factors.top_bar, "More than 12 in of concrete cast below the bar, as scheduled.")
    return Choice(factors.other_bar, "Not a top bar, as scheduled.")


def _coating_straight(row: TerminationLike, _edition: Edition) -> Choice:
    if row.coating in ("none", "zinc"):
        return Choice(factors.uncoated, _coating_words(row))
    one = row.bundle == 1
    if row.clear_cover is not None and row.clear_spacing is not None:
        return Choice(factors.coated_bar if one else bundles.coated_bundle, _coating_words(row))
    if row.c_b is None:
        reason = f"{_coating_words(row)} Clear cover or clear spacing not stated: the smaller factor cannot be claimed."
        return Choice(factors.coated_bar_unknown, reason)
    if short := _short(row):
        return Choice(
            factors.coated_bar_unknown, f"{_coating_words(row)} {short}: the smaller factor cannot be claimed."
        )
    name = "d_b" if one else "d_be"
    return Choice(
        factors.coated_bar_by_c_b if one else bundles.coated_bundle_by_c_b,
        f"{_coating_words(row)} c_b is below 3.5 {name} where cover or spacing is short.",
    )


def _short(row: TerminationLike) -> str:
    """Cover or spacing, where only one of them is stated and falls short, whatever c_b says."""
    d_b = diameter_of_bundle(row)
    if row.clear_cover is not None and row.clear_cover < 3 * d_b:
        return "Clear cover below 3 bar diameters"
    if row.clear_spacing is not None and row.clear_spacing < 6 * d_b:
        return "Clear spacing below 6 bar diameters"
    return ""


def _coating_words(row: TerminationLike) -> str:
    return {"none": "Uncoated.", "zinc": "Zinc-coated.", "epoxy": "Epoxy-coated.", "dual": "Dual-coated."}[row.coating]


def _size(_row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(factors.bar_size)


def _grade(_row: TerminationLike, edition: Edition) -> Choice | None:
    return Choice(edition.grade_factor) if edition.grade_factor else None


def _equivalent_diameter(_row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(bundles.equivalent_diameter)


def _bundle_factor(_row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(bundles.bundle_factor)


STRAIGHT_RULES: Mapping[str, Rule] = {
    "l_d": _straight_length,
    "l_d_a": _straight_equation,
    "psi_t": _casting,
    "psi_e": _coating_straight,
    "psi_s": _size,
    "psi_g": _grade,
    "d_be": _equivalent_diameter,
    "k_bundle": _bundle_factor,
}


# Hooks


def _spacing_known(row: TerminationLike) -> bool:
    return row.spacing is not None or row.clear_spacing is not None


def _centre_spacing(row: TerminationLike, _edition: Edition) -> Choice | None:
    by_clear = row.spacing is None and row.clear_spacing is not None
    return Choice(development.centre_spacing) if by_clear else None


def _hook_length(row: TerminationLike, edition: Edition) -> Choice:
    if edition.hook_reduced is not None and reduces(row, edition):
        return Choice(edition.hook_reduced, _EXCESS)
    return Choice(hooks.hook_minimum)


def _hook_equation(_row: TerminationLike, edition: Edition) -> Choice:
    return Choice(edition.hook)


def _coating_hook(row: TerminationLike, _edition: Edition) -> Choice:
    factor = factors.uncoated_hook if row.coating in ("none", "zinc") else factors.coated_hook
    return Choice(factor, _coating_words(row))


def _hook_psi_c(row: TerminationLike, edition: Edition) -> Choice:
    if not edition.hook_by_cover:
        return Choice(factors.concrete_strength)
    if row.side_cover is None or (row.kind == "hook 90" and row.tail_cover is None):
        return Choice(factors.hook_cover_unknown, "Covers of the hook not stated.")
    return Choice(factors.hook_cover_90 if row.kind == "hook 90" else factors.hook_cover_180)


def _hook_psi_r(row: TerminationLike, edition: Edition) -> Choice:
    if edition.hook_by_cover:
        if row.confining_ties:
            return Choice(factors.hook_in_ties, "Ties or stirrups at 3 d_b or closer, as scheduled.")
        return Choice(factors.hook_without_ties, "No such ties scheduled.")
    if row.confining_ties:
        return Choice(factors.ties_at_hooks, "Ties of 0.4 A_hs or more, as scheduled.")
    if _spacing_known(row):
        return Choice(factors.spaced_hooks, "No confining ties scheduled.")
    return Choice(factors.unconfined, "No confining ties scheduled, spacing of the hooks not stated.")


def _hook_location(row: TerminationLike, _edition: Edition) -> Choice:
    if row.side_cover is None:
        return Choice(factors.location_unknown, _SIDE_UNKNOWN)
    if row.in_column_core:
        return Choice(factors.location_in_core, _IN_CORE)
    return Choice(factors.location_outside_core, _OUTSIDE_CORE)


_SIDE_UNKNOWN = "Side cover not stated."
_IN_CORE = "Ends inside the column core, as scheduled."
_OUTSIDE_CORE = "Not inside a column core."


HOOK_RULES: Mapping[str, Rule] = {
    "l_dh": _hook_length,
    "l_dh_a": _hook_equation,
    "psi_e": _coating_hook,
    "psi_c": _hook_psi_c,
    "psi_r": _hook_psi_r,
    "psi_o": _hook_location,
    "s": _centre_spacing,
}


# Heads


def _head_length(_row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(heads.head_minimum)


def _head_equation(_row: TerminationLike, edition: Edition) -> Choice:
    return Choice(edition.head)


def _parallel_ties(row: TerminationLike, _edition: Edition) -> Choice:
    if row.confining_ties:
        return Choice(factors.ties_at_heads, "Parallel ties of 0.3 A_hs or more, as scheduled.")
    if _spacing_known(row):
        return Choice(factors.spaced_heads, "No parallel ties scheduled.")
    return Choice(factors.unconfined_heads, "No parallel ties scheduled, spacing of the heads not stated.")


def _coating_head(row: TerminationLike, _edition: Edition) -> Choice:
    factor = factors.uncoated_head if row.coating in ("none", "zinc") else factors.coated_head
    return Choice(factor, _coating_words(row))


def _head_location(row: TerminationLike, _edition: Edition) -> Choice:
    if row.side_cover is None:
        return Choice(factors.head_location_unknown, _SIDE_UNKNOWN)
    if row.in_column_core:
        return Choice(factors.head_in_core, _IN_CORE)
    return Choice(factors.head_outside_core, _OUTSIDE_CORE)


def _head_strength(_row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(factors.concrete_strength_heads)


HEAD_RULES: Mapping[str, Rule] = {
    "l_dt": _head_length,
    "l_dt_a": _head_equation,
    "psi_e": _coating_head,
    "psi_p": _parallel_ties,
    "psi_o": _head_location,
    "psi_c": _head_strength,
    "s": _centre_spacing,
}


# Compression


def _compression_length(row: TerminationLike, edition: Edition) -> Choice:
    if bundled(row):
        if reduces(row, edition):
            return Choice(bundles.bundled_compression_reduced, _EXCESS)
        return Choice(bundles.bundled_compression)
    if reduces(row, edition):
        return Choice(compression.compression_reduced, _EXCESS)
    return Choice(compression.compression_minimum)


def _compression_equation(_row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(compression.compression)


def _compression_ties(row: TerminationLike, _edition: Edition) -> Choice:
    if row.confining_ties or row.spiral:
        return Choice(factors.ties_in_compression, "Inside a spiral or close ties, as scheduled.")
    return Choice(factors.without_ties_in_compression, "No spiral or close ties scheduled.")


COMPRESSION_RULES: Mapping[str, Rule] = {
    "l_dc": _compression_length,
    "l_dc_a": _compression_equation,
    "psi_r": _compression_ties,
    "k_bundle": _bundle_factor,
}


# Joints of special moment frames


def _joint_hook(_row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(hooks.joint_hook, "In the confined core of the joint of a special moment frame, as scheduled.")


def _joint_straight(row: TerminationLike, _edition: Edition) -> Choice:
    reason = "Through the confined core of the joint of a special moment frame, as scheduled."
    return Choice(hooks.joint_straight_top if row.top else hooks.joint_straight, reason)


def _joint_equation(_row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(hooks.joint_hook_uncoated)


JOINT_RULES: Mapping[str, Mapping[str, Rule]] = {
    "hook 90": {"l_dh": _joint_hook, "l_dh_j": _joint_equation, "psi_e": _coating_hook},
    "straight tension": {"l_d": _joint_straight, "l_dh_j": _joint_equation, "psi_e": _coating_straight},
}
