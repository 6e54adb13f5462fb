"""Members of the job's schedules on a sheet: the same procedures as the bulk checks, printed step by step."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING, Any

from calcpack import notebook, symbols
from calcpack.errors import Problem, SheetError
from calcpack.formula import Formula
from calcpack.solving import Solving
from calcpack.units import Measured, convert, display_unit
from calcpack.value import Value

if TYPE_CHECKING:
    from calcpack.aci318.editions import Edition
    from calcpack.job import Job

__all__ = ["Scheduled"]


class Scheduled(Solving):
    """What a sheet prints of the schedules; `calcpack.sheet.Sheet` adds what an author writes line by line."""

    _job: Job
    _root: Path

    @property
    def code(self) -> Edition:
        """The provisions of the job's edition of ACI 318, by the role they serve."""
        from calcpack.aci318.editions import edition

        return edition(self._job.codes.concrete)

    def termination(self, mark: str) -> Value:
        """Work the length a row of the anchorage schedule requires, and verify it where the row says what is available.

        Returns
        -------
        the required length

        Raises
        ------
        SheetError : no such mark
        RangeError : everything that is wrong with the row, at once
        """
        from calcpack.job import read_terminations
        from calcpack.members.anchorage import work_termination

        with notebook.reading_inputs():
            rows = read_terminations(self._root)
        row = self._row("anchorage", mark, rows)
        where = f", {row.location}" if row.location else ""
        self._head("anchorage", [row], f"{row.mark}: {row.kind}, #{row.bar} bar{where}")
        required, _ = work_termination(SheetPad(self), row, self.code)
        return required

    def column(self, mark: str) -> None:
        """Work and verify every check of a column of the schedule.

        Raises
        ------
        SheetError : no such mark
        RangeError : everything that is wrong with the row, at once
        """
        from calcpack.job import read_columns, read_forces
        from calcpack.members.column import work_column

        with notebook.reading_inputs():
            rows, listed = read_columns(self._root), read_forces(self._root)
        row = self._row("columns", mark, rows)
        forces = [force for force in listed if force.mark == mark]
        self._head("columns", [row], f"{row.mark}: {row.shape} column", [(f"forces {mark}", forces)])
        work_column(SheetPad(self), row, forces, self.code)

    def _row(self, table: str, mark: str, rows: Sequence[Any]) -> Any:
        found = [row for row in rows if row.mark == mark]
        if not found:
            marks = ", ".join(row.mark for row in rows) or "none"
            problem = Problem(
                f"mark {mark!r}", f"a mark of inputs/{table}.csv: {marks}", "add the row, or correct the mark"
            )
            raise SheetError("schedule", [problem], self._place())
        return found[0]

    def _head(self, table: str, rows: Sequence[Any], text: str, more: Sequence[tuple[str, Sequence[Any]]] = ()) -> None:
        from calcpack.job import row_digest

        self._begin()
        listed = [(f"{table} {row.mark}", [row]) for row in rows] + list(more)
        reads = [[key, "".join(row_digest(row) for row in found)] for key, found in listed]
        self._show("heading", reads=reads, text=text, level=2)


@dataclass(frozen=True)
class SheetPad:
    """A sheet as the pad on which a check procedure works."""

    sheet: Any

    def given(self, symbol: str, value: float, means: str, source: str) -> Value:
        """A given of the sheet, from a schedule or a table of the trade."""
        dimension = symbols.lookup(symbol).dimension
        unit = display_unit(dimension)
        measured = Measured(value, dimension, unit, convert(value, unit))
        made: Value = self.sheet._set_given(symbol, measured, means, source, "confirmed", "")
        return made

    def work(self, formula: Formula, **values: Value) -> Value:
        """A working of the sheet."""
        made: Value = self.sheet.work(formula, **values)
        return made

    def number(self, value: Value) -> float:
        """The number behind a value."""
        return float(value)

    def reason(self, text: str) -> None:
        """A short note above the next step."""
        self.sheet._note("reason", [text])

    def verify(self, what: str, demand: Value, capacity: Value, clause: str) -> float:
        """A verdict of the sheet."""
        return float(self.sheet.verify(what, demand=demand, capacity=capacity, clause=clause))

    def heading(self, text: str) -> None:
        """A heading below that of the member."""
        self.sheet.heading(text, 3)
