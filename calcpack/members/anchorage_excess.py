"""Whether a length may be reduced for excess reinforcement, and why not."""

from __future__ import annotations

from calcpack.aci318.editions import Edition
from calcpack.members.termination import TerminationLike

__all__ = ["no_reduction", "reduces"]

_WORDS = {
    "noncontinuous support": "the bars end at a noncontinuous support",
    "f_y required": "the bars have to be developed for f_y",
    "continuous bars": "the bars have to be continuous",
    "seismic": "the bars belong to the seismic-force-resisting system",
}


def reduces(row: TerminationLike, edition: Edition) -> bool:
    """Whether the row states both areas, and its length may be reduced for them."""
    return row.A_s_required is not None and not no_reduction(row, edition)


def no_reduction(row: TerminationLike, edition: Edition) -> str:
    """Why the length may not be reduced, with the clause; empty where it may."""
    if row.kind in ("lap tension", "lap compression"):
        return "not permitted in laps (25.5.1.4)"
    if row.kind == "mechanical splice":
        return "a mechanical splice develops 1.25 f_y whatever the area (25.5.7.1)"
    if row.kind == "headed":
        return f"not permitted for headed bars ({'25.4.10.1' if edition.hook_reduced is None else '25.4.10.2'})"
    if row.kind in ("hook 90", "hook 180") and edition.hook_reduced is None:
        return "not permitted for hooks (25.4.10.1)"
    if row.joint == "special":
        return f"{_WORDS['seismic']} (25.4.10.2)"
    return f"{_WORDS[row.excess_exclusion]} (25.4.10.2)" if row.excess_exclusion else ""
