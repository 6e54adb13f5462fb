"""Members of the job's schedules on a sheet: the same procedures as the bulk checks, printed step by step."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING, Any

from calcpack import notebook, symbols
from calcpack.errors import Problem, SheetError
from calcpack.formula import Formula
from calcpack.solving import Solving
from calcpack.tabulation import Row, Tabulated, Tabulation
from calcpack.units import Measured, convert, display_unit
from calcpack.value import Value

if TYPE_CHECKING:
    from calcpack.aci318.editions import Edition
    from calcpack.job import Job
    from calcpack.members.results import CheckResult

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

    def termination(self, mark: str, figure: bool = True) -> Value:
        """Work the length a row of the anchorage schedule requires, and verify it where the row says what is available.

        Parameters
        ----------
        figure : draw the detail to scale below its working

        Returns
        -------
        the required length

        Raises
        ------
        SheetError : no such mark
        RangeError : everything that is wrong with the row, at once
        """
        return self._work_termination(mark, figure)[1]

    def _work_termination(self, mark: str, figure: bool) -> tuple[Any, Value]:
        from calcpack.job import read_terminations
        from calcpack.members.anchorage import work_termination
        from calcpack.members.termination_figures import DRAWN, termination_figure

        with notebook.reading_inputs():
            rows = read_terminations(self._root)
        row = self._row("anchorage", mark, rows)
        where = f", {row.location}" if row.location else ""
        self._head("anchorage", [row], f"{row.mark}: {row.kind}, #{row.bar} bar{where}")
        pad = SheetPad(self)
        required, _ = work_termination(pad, row, self.code)
        if figure and row.kind in DRAWN:
            pad.figure(lambda: termination_figure(row, float(required)))
        return row, required

    def column(self, mark: str) -> None:
        """Work and verify every check of a column of the schedule.

        Raises
        ------
        SheetError : no such mark
        RangeError : everything that is wrong with the row, at once
        """
        self._work_column(mark)

    def _work_column(self, mark: str) -> tuple[Any, list[CheckResult]]:
        from calcpack.job import read_columns, read_forces, read_stories
        from calcpack.members.column import Context, work_column
        from calcpack.members.column_loads import combined

        with notebook.reading_inputs():
            rows, listed, stories = read_columns(self._root), read_forces(self._root), read_stories(self._root)
        row = self._row("columns", mark, rows)
        own = [force for force in listed if force.mark == mark]
        told = [one for one in stories if row.story and one.story == row.story]
        reads: list[tuple[str, Sequence[Any]]] = [
            (f"forces {mark}", own),
            *([(f"stories {row.story}", told)] if row.story else []),
        ]
        self._head("columns", [row], f"{row.mark}: {row.shape} column", reads, settings=True)
        job = self._job
        forces = combined(row, own, job.codes.loads, job.combining)
        return row, work_column(SheetPad(self), row, forces, Context(self.code, told, job.columns.stiffness))

    def _row(self, table: str, mark: str, rows: Sequence[Any]) -> Any:
        found = [row for row in rows if row.mark == mark]
        if not found:
            marks = ", ".join(row.mark for row in rows) or "none"
            problem = Problem(
                f"mark {mark!r}", f"a mark of inputs/{table}.csv: {marks}", "add the row, or correct the mark"
            )
            raise SheetError("schedule", [problem], self._place())
        return found[0]

    def _head(
        self,
        table: str,
        rows: Sequence[Any],
        text: str,
        more: Sequence[tuple[str, Sequence[Any]]] = (),
        settings: bool = False,
    ) -> None:
        from calcpack.job import row_digest

        self._begin()
        listed = [(f"{table} {row.mark}", [row]) for row in rows] + list(more)
        reads = [[key, "".join(row_digest(row) for row in found)] for key, found in listed]
        if settings:
            reads.append(["job settings", repr((self._job.combining, self._job.columns))])
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

    def tabulate(self, table: Tabulation, rows: Sequence[Row[Value]], shared: Mapping[str, Value]) -> Tabulated[Value]:
        """A worked table of the sheet."""
        made: Tabulated[Value] = self.sheet.tabulate(table, rows, shared)
        return made

    def solved(
        self, symbol: str, value: float, means: str, method: str, clause: str, solved_from: Sequence[Value]
    ) -> Value:
        """A solved value of the sheet."""
        dimension = symbols.lookup(symbol).dimension
        unit = display_unit(dimension)
        measured = Measured(value, dimension, unit, convert(value, unit))
        edition = self.sheet.code.name
        made: Value = self.sheet._set_solved(symbol, measured, means, method, clause, solved_from, edition)
        return made

    def confirm(self, solved: Sequence[Value], by: Sequence[Value]) -> None:
        """What confirms solved values."""
        self.sheet.confirm(solved, by)

    def figure(self, draw: Callable[[], Any]) -> None:
        """A figure of the sheet."""
        self.sheet.figure(draw())

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
