"""The development and lap schedule of the general notes: for every bar size the length that each kind of end needs.

A cell is a row of the anchorage schedule that no detail asked for: it is worked by the same procedure as a row of
`anchorage.csv`, and the length is then rounded up to what a drawing states.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field
from math import ceil
from typing import Any, Generic, TypeVar

from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.errors import RangeError
from calcpack.formula import formula
from calcpack.members.anchorage import required_length
from calcpack.members.length_basis import Basis, EndConditions, Strengths
from calcpack.members.length_notes import NoteList
from calcpack.members.pad import Pad
from calcpack.members.termination import Termination
from calcpack.symbols import lookup
from calcpack.units import Length

__all__ = [
    "COLUMNS",
    "LengthCell",
    "LengthColumn",
    "LengthTable",
    "needs_room",
    "rounded_up",
    "row_for",
    "state_strengths",
    "work_column",
    "work_lengths",
]

T = TypeVar("T")
_CLOSE = 6.0
_HIGH_GRADE = 80_000.0
_NORMAL = "normalweight concrete, default of the schedule"


# What exceeds a multiple by a billionth is the noise of arithmetic; a ratio of that much over 1 is OK as well.
@formula("rounding of the schedule")
def rounded_up(*, l_required: Length, l_increment: Length) -> Length:
    """Length rounded up to a multiple of the increment.

    >>> [rounded_up(l_required=l, l_increment=1.0) for l in (24.2, 25.0, 25.000000001, 25.0001)]
    [25.0, 25.0, 25.0, 26.0]
    """
    l_round: Length = ceil(0.999999999 * l_required / l_increment) * l_increment
    return l_round


@dataclass(frozen=True)
class LengthColumn:
    """A column: the kind of end, the symbol of its length, words for its head, and what its rows state.

    `name` says the same without the symbol.
    """

    kind: str
    symbol: str
    words: str
    name: str
    states: Mapping[str, Any] = field(default_factory=dict)


def _column(kind: str, symbol: str, words: str, name: str = "", **states: Any) -> LengthColumn:
    return LengthColumn(kind, symbol, words, name or words, states)


COLUMNS = (
    _column("straight tension", "l_d", "top", "straight, top", top=True),
    _column("straight tension", "l_d", "other", "straight, other"),
    _column("hook 90", "l_dh", "hook 90°"),
    _column("hook 180", "l_dh", "hook 180°"),
    _column("headed", "l_dt", "headed"),
    _column("straight compression", "l_dc", "compression"),
    _column("lap tension", "l_st", "lap A, top", lap_class="A", top=True),
    _column("lap tension", "l_st", "lap A, other", lap_class="A"),
    _column("lap tension", "l_st", "lap B, top", lap_class="B", top=True),
    _column("lap tension", "l_st", "lap B, other", lap_class="B"),
    _column("lap compression", "l_sc", "compr. lap", "compression lap"),
)


@dataclass(frozen=True)
class LengthCell(Generic[T]):
    """A cell: the length required and the length rounded up, or the numbers of the notes that say why there is none."""

    required: T | None = None
    rounded: T | None = None
    notes: tuple[int, ...] = ()


@dataclass(frozen=True)
class LengthTable(Generic[T]):
    """One table of the schedule: a row of cells, in the order of `COLUMNS`, for each bar size."""

    strengths: Strengths
    rows: Mapping[int, Sequence[LengthCell[T]]]


def row_for(column: LengthColumn, size: int, strengths: Strengths, basis: Basis, edition: Edition) -> Termination:
    """The row of an anchorage schedule that a cell stands for."""
    return Termination(
        mark=f"#{size} {column.name}", kind=column.kind, bar=size, f_c=strengths.f_c, f_y=strengths.f_y,
        lamb=strengths.lamb, coating=strengths.coating, file=basis.source,
        **{**_CONDITIONS[column.kind](size, basis), **_apart(column, size, strengths, basis, edition)}, **column.states,
    )  # fmt: skip


def _bars(size: int, basis: Basis) -> Mapping[str, Any]:
    """Cover and spacing of straight bars, as the table takes them or as the general equation does."""
    if basis.clear_cover is None or basis.clear_spacing is None:
        return {}
    cover, spacing, d_b = basis.clear_cover.of(size), basis.clear_spacing.of(size), bar(size).d_b
    if basis.general:
        return {"c_b": min(cover + d_b / 2, (spacing + d_b) / 2)}
    return {"clear_cover": cover, "clear_spacing": spacing}


def _apart(column: LengthColumn, size: int, strengths: Strengths, basis: Basis, edition: Edition) -> Mapping[str, Any]:
    """The spacing from which bars of high grade need no transverse reinforcement; a note says so."""
    if basis.general or basis.clear_spacing is None or not needs_room(strengths, edition):
        return {}
    if column.symbol not in ("l_d", "l_st"):
        return {}
    return {"spacing": max(_CLOSE, basis.clear_spacing.of(size) + bar(size).d_b)}


def needs_room(strengths: Strengths, edition: Edition) -> bool:
    """Whether bars need 6 in from centre to centre, or transverse reinforcement that the schedule does not count."""
    return edition.close_bars_need_ties and strengths.f_y >= _HIGH_GRADE


def _ends(size: int, ends: EndConditions) -> dict[str, Any]:
    return {
        "side_cover": ends.side_cover.of(size) if ends.side_cover else None,
        "confining_ties": ends.ties,
        "in_column_core": ends.in_column_core,
    }


def _tail(size: int, ends: EndConditions) -> Mapping[str, Any]:
    return {"tail_cover": ends.tail_cover.of(size) if ends.tail_cover else None}


_CONDITIONS: Mapping[str, Any] = {
    "straight tension": _bars,
    "lap tension": _bars,
    "hook 90": lambda size, basis: {**_ends(size, basis.hooks), **_tail(size, basis.hooks)},
    "hook 180": lambda size, basis: _ends(size, basis.hooks),
    "headed": lambda size, basis: _ends(size, basis.heads),
    "straight compression": lambda _size, basis: {"confining_ties": basis.confined},
    # Above Grade 80 a compression lap is compared with the tension lap, which asks for cover and spacing.
    "lap compression": lambda size, basis: {**_bars(size, basis), "confining_ties": basis.lap_ties},
}


def state_strengths(pad: Pad[T], tables: Sequence[Strengths], basis: Basis) -> T:
    """State what the cells of the tables use, symbol by symbol; returns the increment."""
    for symbol in ("f_c", "f_y", "lamb"):
        for one in tables:
            value = float(getattr(one, symbol))
            source = _NORMAL if (symbol, value) == ("lamb", 1.0) else one.source
            pad.given(symbol, value, lookup(symbol).meaning, source)
    stated = "default of the schedule" if basis.increment == Basis().increment else basis.source
    return pad.given("l_increment", basis.increment, lookup("l_increment").meaning, stated)


def work_column(pad: Pad[T], row: Termination, increment: T, edition: Edition) -> tuple[T, T]:
    """Work the length that a cell requires, and round it up.

    Raises
    ------
    RangeError : why the edition has no such length, everything at once
    """
    required = required_length(pad, row, edition).value
    return required, pad.work(rounded_up, l_required=required, l_increment=increment)


def work_lengths(
    pad: Pad[T], strengths: Strengths, basis: Basis, edition: Edition, notes: NoteList, increment: T
) -> LengthTable[T]:
    """Work one table of the schedule.

    Parameters
    ----------
    pad : where it is worked
    notes : takes in why a cell has no length
    increment : as `state_strengths` stated it on the pad

    Raises
    ------
    RangeError : the edition has no length at all for these strengths
    """
    rows: dict[int, list[LengthCell[T]]] = {size: [] for size in basis.sizes}
    refused: list[RangeError] = []
    for size, cells in rows.items():
        for column in COLUMNS:
            row = row_for(column, size, strengths, basis, edition)
            pad.heading(f"#{size} {column.name}")
            try:
                cells.append(LengthCell(*work_column(pad, row, increment, edition)))
            except RangeError as error:
                refused.append(error)
                cells.append(LengthCell(notes=notes.numbers(column.kind, error)))
    if not any(cell.rounded is not None for cells in rows.values() for cell in cells):
        raise RangeError("no length can be given", refused[0].problems, strengths.source)
    return LengthTable(strengths, rows)
