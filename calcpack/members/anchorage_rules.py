"""Which equation or factor serves a row of the anchorage schedule, and the reason that is printed beside it."""

from __future__ import annotations

from collections.abc import Callable, Mapping

from calcpack.aci318 import compression, development, factors, heads, hooks, laps
from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.members.termination import TerminationLike
from calcpack.members.working import Choice

__all__ = [
    "COMPRESSION_LAP_RULES",
    "COMPRESSION_RULES",
    "HEAD_RULES",
    "HOOK_RULES",
    "LAP_RULES",
    "STRAIGHT_RULES",
    "Rule",
]


Rule = Callable[[TerminationLike, Edition], Choice | None]


# Straight bars in tension


def _straight_equation(row: TerminationLike, edition: Edition) -> Choice:
    if row.c_b is not None:
        return Choice(edition.straight_tension, "General equation: c_b is stated.")
    unstated = [name for name in ("clear cover", "clear spacing") if getattr(row, name.replace(" ", "_")) is None]
    if unstated:
        return Choice(edition.straight_tension_other, f"Table, other cases: {' and '.join(unstated)} not stated.")
    return _straight_table(row, edition)


def _straight_table(row: TerminationLike, edition: Edition) -> Choice:
    d_b = bar(row.bar).d_b
    cover, spacing = row.clear_cover or 0.0, row.clear_spacing or 0.0
    facts = f"clear cover {cover:g} in = {cover / d_b:.2f} d_b, clear spacing {spacing:g} in = {spacing / d_b:.2f} d_b"
    if cover >= d_b and spacing >= 2 * d_b:
        return Choice(edition.straight_tension_spaced, f"Table, first row: {facts}; at least d_b and 2 d_b.")
    if cover >= d_b and spacing >= d_b and row.confining_ties:
        reason = f"Table, first row: {facts}; at least d_b each, with the least ties or stirrups along the bar."
        return Choice(edition.straight_tension_spaced, reason)
    return Choice(edition.straight_tension_other, f"Table, other cases: {facts}.")


def _straight_length(row: TerminationLike, _edition: Edition) -> Choice:
    if row.A_s_required is None:
        return Choice(development.straight_tension_minimum)
    return Choice(development.straight_tension_reduced, _EXCESS)


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
    if row.clear_cover is not None and row.clear_spacing is not None:
        return Choice(factors.coated_bar, _coating_words(row))
    if row.c_b is None:
        reason = f"{_coating_words(row)} Clear cover or clear spacing not stated: the smaller factor cannot be claimed."
        return Choice(factors.coated_bar_unknown, reason)
    return Choice(
        factors.coated_bar_by_c_b, f"{_coating_words(row)} c_b is below 3.5 d_b where cover or spacing is short."
    )


def _coating_words(row: TerminationLike) -> str:
    return {"none": "Uncoated.", "zinc": "Zinc-coated.", "epoxy": "Epoxy-coated.", "dual": "Dual-coated."}[row.coating]


def _size(_row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(factors.bar_size)


def _grade(_row: TerminationLike, edition: Edition) -> Choice | None:
    return Choice(edition.grade_factor) if edition.grade_factor else None


STRAIGHT_RULES: Mapping[str, Rule] = {
    "l_d": _straight_length,
    "l_d_a": _straight_equation,
    "psi_t": _casting,
    "psi_e": _coating_straight,
    "psi_s": _size,
    "psi_g": _grade,
}


# Hooks


def _spacing_known(row: TerminationLike) -> bool:
    return row.spacing is not None or row.clear_spacing is not None


def _centre_spacing(row: TerminationLike, _edition: Edition) -> Choice | None:
    by_clear = row.spacing is None and row.clear_spacing is not None
    return Choice(development.centre_spacing) if by_clear else None


def _hook_length(row: TerminationLike, edition: Edition) -> Choice:
    if row.A_s_required is not None and edition.hook_reduced is not None:
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


def _compression_length(row: TerminationLike, _edition: Edition) -> Choice:
    if row.A_s_required is None:
        return Choice(compression.compression_minimum)
    return Choice(compression.compression_reduced, _EXCESS)


def _compression_equation(_row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(compression.compression)


def _compression_ties(row: TerminationLike, _edition: Edition) -> Choice:
    if row.confining_ties:
        return Choice(factors.ties_in_compression, "Inside a spiral or close ties, as scheduled.")
    return Choice(factors.without_ties_in_compression, "No spiral or close ties scheduled.")


COMPRESSION_RULES: Mapping[str, Rule] = {
    "l_dc": _compression_length,
    "l_dc_a": _compression_equation,
    "psi_r": _compression_ties,
}


# Laps


def _lap_class(row: TerminationLike, _edition: Edition) -> Choice:
    if row.lap_class == "A":
        return Choice(
            laps.lap_class_a, "Class A, as scheduled: twice the area required, at most half the bars spliced."
        )
    return Choice(laps.lap_class_b, "Class B, as scheduled." if row.lap_class else "Class B: class not stated.")


LAP_RULES: Mapping[str, Rule] = {**STRAIGHT_RULES, "l_st": _lap_class}


def _lap_compression_length(row: TerminationLike, _edition: Edition) -> Choice:
    if row.confining_ties:
        return Choice(laps.lap_in_ties, "Column ties of 0.0015 h s or more in both directions, as scheduled.")
    return Choice(laps.lap_without_reduction, "No reduction for column ties or spiral.")


def _lap_compression_equation(row: TerminationLike, _edition: Edition) -> Choice:
    return Choice(laps.lap_compression_high_grade if row.f_y > 80_000 else laps.lap_compression)


COMPRESSION_LAP_RULES: Mapping[str, Rule] = {
    **LAP_RULES,
    "l_sc": _lap_compression_length,
    "l_sc_a": _lap_compression_equation,
}
