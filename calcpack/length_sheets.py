"""The development and lap schedule on a sheet: a table for each concrete, grade and coating, fit for the general notes.

Every length printed is an entry of the ledger. The cells are worked on the sheet's own pad without being shown; one
bar size is worked in full below the tables, and its cells link there.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, field, replace
from typing import TYPE_CHECKING, Any

from calcpack import notebook
from calcpack.errors import InputError
from calcpack.formula import Formula
from calcpack.scheduled import Scheduled, SheetPad
from calcpack.tabulating import fixed_text
from calcpack.tabulation import Row, Tabulated, Tabulation
from calcpack.typeset.line import with_unit
from calcpack.units import LENGTH
from calcpack.value import Value

if TYPE_CHECKING:
    from calcpack.job.length_settings import Lengths
    from calcpack.members.length_notes import NoteList
    from calcpack.members.length_schedule import LengthCell, LengthTable

__all__ = ["LengthSheets", "SharingPad"]

_TITLE = "Development and lap lengths"


@dataclass
class SharingPad:
    """A sheet as a pad that states and works the same thing once; `kept` holds what stands on it so far.

    Headings and reasons wait for the step that they are about, and are dropped where that step stands already.
    """

    pad: SheetPad
    kept: dict[Any, Value] = field(default_factory=dict)
    _waiting: list[Callable[[], None]] = field(default_factory=list)
    _headed: bool = False

    def given(self, symbol: str, value: float, means: str, source: str) -> Value:
        """A given, whatever its source where it was stated first."""
        key = (symbol, value, means)
        if key not in self.kept:
            self._say()
            self.kept[key] = self.pad.given(symbol, value, means, source)
        return self.kept[key]

    def work(self, formula: Formula, **values: Value) -> Value:
        """A working."""
        key = (formula, tuple((name, value.entry.id) for name, value in values.items()))
        if key in self.kept:
            # What was said of this step stands where it was taken; the heading may still get a step of its own.
            self._waiting = self._waiting[:1] if self._headed else []
        else:
            self._say()
            self.kept[key] = self._work(formula, values)
        return self.kept[key]

    def _work(self, formula: Formula, values: Mapping[str, Value]) -> Value:
        return self.pad.work(formula, **values)

    def _say(self) -> None:
        for say in self._waiting:
            say()
        self._waiting, self._headed = [], False

    def tabulate(self, table: Tabulation, rows: Sequence[Row[Value]], shared: Mapping[str, Value]) -> Tabulated[Value]:
        """A worked table, never shared."""
        self._say()
        return self.pad.tabulate(table, rows, shared)

    def solved(
        self, symbol: str, value: float, means: str, method: str, clause: str, solved_from: Sequence[Value]
    ) -> Value:
        """A solved value, never shared."""
        self._say()
        return self.pad.solved(symbol, value, means, method, clause, solved_from)

    def confirm(self, solved: Sequence[Value], by: Sequence[Value]) -> None:
        """What confirms solved values."""
        self.pad.confirm(solved, by)

    def figure(self, draw: Callable[[], Any]) -> None:
        """A figure."""
        self._say()
        self.pad.figure(draw)

    def number(self, value: Value) -> float:
        """The number behind a value."""
        return float(value)

    def reason(self, text: str) -> None:
        """A short note above the next step."""
        self._waiting.append(lambda: self.pad.reason(text))

    def verify(self, what: str, demand: Value, capacity: Value, clause: str) -> float:
        """A verdict."""
        self._say()
        return self.pad.verify(what, demand, capacity, clause)

    def heading(self, text: str) -> None:
        """A heading of the steps that follow, if there are any."""
        self._waiting, self._headed = [lambda: self.pad.heading(text)], True


class _CellPad(SharingPad):
    """A pad for cells that are not shown: a rounded length is named after its cell, as that of a worked table is."""

    _cell = ""

    def heading(self, text: str) -> None:
        """The name of the cell."""
        self._cell = text

    def reason(self, text: str) -> None:
        """Dropped."""

    def work(self, formula: Formula, **values: Value) -> Value:
        """A working; the rounding of each cell is its own, though two ends may need the same length."""
        from calcpack.members.length_schedule import rounded_up

        return self._round(formula, values) if formula is rounded_up else super().work(formula, **values)

    def _round(self, formula: Formula, values: Mapping[str, Value]) -> Value:
        sheet = self.pad.sheet
        recorded = formula.record(**{name: float(value) for name, value in values.items()}).lines[-1]
        known = {name: value.entry.id for name, value in values.items()}
        shown = with_unit(_text(recorded.value, float(values["l_increment"])), "in")
        (identifier,) = sheet._free_ids([recorded.line.target])
        entry = sheet._worked(formula, recorded, identifier, shown, known, formula.clause())
        made: Value = sheet._keep(replace(entry, means=f"{entry.means}, {self._cell}"), LENGTH)
        return made


class LengthSheets(Scheduled):
    """What a sheet prints of the development and lap schedule."""

    def lengths(self) -> None:
        """The development and lap schedule of the job: tables, notes, and one bar size worked in full.

        What it is for and what its lengths hold for stand in job.toml, ``[lengths]``.

        Raises
        ------
        TableError : nothing in the job names a concrete and a grade
        RangeError : strengths for which the edition has no length at all
        """
        from calcpack.job.length_settings import lengths_of
        from calcpack.members.length_notes import NoteList
        from calcpack.members.length_schedule import state_strengths, work_lengths

        with notebook.reading_inputs():
            asked = lengths_of(self._job)
        self._begin()
        self._show("heading", reads=[["job lengths", repr(asked)]], text=_TITLE, level=2)
        stated = SharingPad(SheetPad(self))
        increment = state_strengths(stated, asked.strengths, asked.basis)
        with self._holding() as items:
            worked = self._worked_example(asked, dict(stated.kept), increment)
        notes = NoteList()
        for one in asked.strengths:
            before = len(self._values)
            pad = _CellPad(SheetPad(self), dict(stated.kept))
            try:
                with self._holding():
                    table = work_lengths(pad, one, asked.basis, self.code, notes, increment)
            except InputError as error:
                raise error.at(self._place()) from None
            printed = worked if one is asked.strengths[0] else {}
            made = list(self._values.values())[before:]
            self._length_table(table, asked, printed, made, first=one is asked.strengths[0])
        self._length_notes(asked, notes)
        for item in items:
            notebook.show(item)

    def _worked_example(self, asked: Lengths, kept: dict[Any, Value], increment: Value) -> dict[int, Value]:
        """Work one size in full for the first strengths; the rounded lengths by the place of their column."""
        from calcpack.errors import RangeError
        from calcpack.members.length_notes import table_title
        from calcpack.members.length_schedule import COLUMNS, row_for, work_column

        strengths, size = asked.strengths[0], asked.worked
        self._show("heading", text=f"Worked example: #{size}, {table_title(strengths)}", level=2)
        pad, made = SharingPad(SheetPad(self), kept), dict[int, Value]()
        for place, column in enumerate(COLUMNS):
            pad.heading(f"#{size} {column.name}")
            row = row_for(column, size, strengths, asked.basis, self.code)
            try:
                _, made[place] = work_column(pad, row, increment, self.code)
            except RangeError:
                continue  # The cell has its note.
        return made

    def _length_table(
        self,
        table: LengthTable[Value],
        asked: Lengths,
        printed: Mapping[int, Value],
        made: Sequence[Value],
        first: bool,
    ) -> None:
        from calcpack.members.length_notes import table_title
        from calcpack.members.length_schedule import COLUMNS, rounded_up

        rows = []
        for size, cells in table.rows.items():
            linked = printed if size == asked.worked else {}
            shown = [_cell(cell, linked.get(place), asked.basis.increment) for place, cell in enumerate(cells)]
            rows.append({"label": f"#{size}", "cells": shown})
        sheet: Any = self
        equations = sheet._general(rounded_up.clause(), rounded_up) if first else []
        title = "Lengths rounded up" if first else "Lengths rounded up in the same way"
        self._show(
            "tabulated", [value.entry for value in made], title=title, label="bar",
            caption=f"{table_title(table.strengths)}: development and lap lengths, in",
            equations=equations,
            columns=[{"symbol": column.symbol, "unit": column.words} for column in COLUMNS], rows=rows, totals=[],
        )  # fmt: skip

    def _length_notes(self, asked: Lengths, notes: NoteList) -> None:
        from calcpack.members.length_notes import assumptions

        sheet: Any = self
        self._show("heading", text="Notes to the lengths", level=3)
        texts = [*notes.texts, *assumptions(asked.strengths, asked.basis, self.code)]
        for number, text in enumerate(texts, 1):
            sheet._note("reason", [f"{number}. {text}"])


def _cell(cell: LengthCell[Value], printed: Value | None, increment: float) -> dict[str, str]:
    """A cell as the page prints it; `printed` is its length where the page works it in full, and is linked to."""
    from calcpack.members.length_notes import dash

    value = printed or cell.rounded
    if value is None:
        return {"id": "", "text": dash(cell.notes), "link": "", "sheet": ""}
    here, link = ("", value.entry.id) if printed else (value.entry.id, "")
    return {"id": here, "text": _text(float(value), increment), "link": link, "sheet": ""}


def _text(value: float, increment: float) -> str:
    from calcpack.members.length_notes import decimals

    return fixed_text(value, decimals(increment))
