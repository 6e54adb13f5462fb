"""Details to scale of the rows of an anchorage schedule: the length required beside the length available."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import replace
from typing import TYPE_CHECKING

from calcpack.aci318 import hooks
from calcpack.aci318.bars import bar
from calcpack.errors import Problem, RangeError
from calcpack.ledger import passes
from calcpack.members.anchorage_splices import HALF
from calcpack.members.termination import TerminationLike, row_of

if TYPE_CHECKING:
    from calcpack.figures import Figure

__all__ = ["DRAWN", "stagger_figure", "termination_figure"]

# The head is drawn round and least: a net bearing area of four bar areas, ACI 318 25.4.4.1, five with the bar.
_HEAD_AREAS = 5.0
_COATED = {"none": "", "epoxy": ", epoxy-coated", "zinc": ", zinc-coated", "dual": ", dual-coated"}


def termination_figure(row: TerminationLike, required: float) -> Figure:
    """The detail of a row, to scale, with its required length and the length available where the row states it.

    Parameters
    ----------
    row : of the anchorage schedule
    required : length the row requires, inches

    Raises
    ------
    RangeError : a kind that has no detail (see `DRAWN`), or a length that is not positive
    """
    if row.kind not in _DRAW:
        problem = Problem(f"kind {row.kind!r}", f"one of {', '.join(_DRAW)}", "draw it without this", row_of(row))
        raise RangeError(f"no detail of {row.mark}", [problem])
    figure = _DRAW[row.kind](row, _shown(row, required))
    return replace(figure, caption=_caption(row, _WORDS[row.kind]))


def stagger_figure(row: TerminationLike, required: float) -> Figure | None:
    """The laps of neighbouring bars of a row, staggered for class A; None where the row states too little to draw it.

    Parameters
    ----------
    row : of the anchorage schedule
    required : lap that the row requires, inches
    """
    from calcpack.figures import lap_stagger

    d_b, letter = bar(row.bar).d_b, _lap_class(row)
    if row.kind != "lap tension" or not letter or row.spacing is None or row.spacing <= 2 * d_b:
        return None
    staggered = letter == "A" or (row.spliced is not None and row.spliced <= HALF)
    figure = lap_stagger(
        d_b=d_b,
        lap=required,
        spacing=row.spacing,
        stagger=required if staggered else 0.0,
        bar_label=_label(row),
        lap_class=letter,
        mark=row.mark,
    )
    return replace(figure, caption=_caption(row, "laps of neighbouring bars"))


def _shown(row: TerminationLike, required: float) -> float:
    """The length required; that available where the ledger passes the one as the other."""
    if row.available is None or not row.available > 0 or not passes(required / row.available):
        return required
    return min(required, row.available)


def _caption(row: TerminationLike, words: str) -> str:
    """Mark, kind, bar and location: ``H1: headed bar, #7 top, top bars in the column on grid 4``."""
    where = getattr(row, "location", "") or getattr(row, "member", "")
    lettered = f" of class {_lap_class(row)}" if _lap_class(row) else ""
    return f"{row.mark}: {words}{lettered}, {_label(row)}{_COATED[row.coating]}{f', {where}' if where else ''}"


def _label(row: TerminationLike) -> str:
    bundled = f", bundle of {row.bundle}" if row.bundle > 1 else ""
    return f"#{row.bar}{' top' if row.top else ''}{bundled}"


def _lap_class(row: TerminationLike) -> str:
    """The class where the schedule alone decides it."""
    if row.kind != "lap tension" or row.lap_class is None:
        return ""
    decided = row.lap_class == "B" or (row.spliced is None and row.bar_stress is None)
    return row.lap_class if decided else ""


def _top_cover(row: TerminationLike) -> float | None:
    return row.clear_cover if row.top else None


def _straight(row: TerminationLike, required: float) -> Figure:
    from calcpack.figures import straight_end

    compression = row.kind == "straight compression"
    return straight_end(
        d_b=bar(row.bar).d_b,
        l_d=required,
        available=row.available,
        bar_label=_label(row),
        symbol="ℓ_{dc}" if compression else "ℓ_{d}",
        compression=compression,
        cover=row.clear_cover,
        top=row.top,
        mark=row.mark,
    )


def _hook(row: TerminationLike, required: float) -> Figure:
    from calcpack.figures import hooked_end

    d_b = bar(row.bar).d_b
    extension = hooks.extension_90 if row.kind == "hook 90" else hooks.extension_180
    return hooked_end(
        d_b=d_b,
        bend=90 if row.kind == "hook 90" else 180,
        bend_diameter=hooks.bend_diameter(d_b=d_b),
        extension=extension(d_b=d_b),
        l_dh=required,
        available=row.available,
        bar_label=_label(row),
        tail_cover=row.tail_cover,
        cover=_top_cover(row),
        side_cover=row.side_cover,
        mark=row.mark,
    )


def _headed(row: TerminationLike, required: float) -> Figure:
    from calcpack.figures import headed_detail

    one = bar(row.bar)
    return headed_detail(
        d_b=one.d_b,
        head_width=2 * math.sqrt(_HEAD_AREAS * one.A_b / math.pi),
        l_dt=required,
        available=row.available,
        bar_label=_label(row),
        head_label="head, bearing area 4 bar areas",
        cover=_top_cover(row),
        side_cover=row.side_cover,
        mark=row.mark,
    )


def _lap(row: TerminationLike, required: float) -> Figure:
    from calcpack.figures import lap_detail

    other = row.other_bar or row.bar
    label = _label(row)
    return lap_detail(
        d_b=bar(row.bar).d_b,
        lap_required=required,
        lap_available=row.available,
        bar_label=label,
        other_d_b=bar(other).d_b,
        other_label=label if other == row.bar else f"#{other}",
        compression=row.kind == "lap compression",
        lap_class=_lap_class(row),
        mark=row.mark,
    )


_DRAW: dict[str, Callable[[TerminationLike, float], Figure]] = {
    "straight tension": _straight,
    "hook 90": _hook,
    "hook 180": _hook,
    "headed": _headed,
    "straight compression": _straight,
    "lap tension": _lap,
    "lap compression": _lap,
}

_WORDS = {
    "straight tension": "straight bar in tension",
    "hook 90": "standard 90° hook",
    "hook 180": "standard 180° hook",
    "headed": "headed bar",
    "straight compression": "straight bar in compression",
    "lap tension": "tension lap",
    "lap compression": "compression lap",
}

DRAWN = frozenset(_DRAW)
