"""The column schedule on sheets: a summary of every column, full working where it is asked for, a line for the rest.

Columns that are not printed in full are worked all the same: their entries stand in the ledger, so that every ratio of
the summary can be traced.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from math import isclose
from typing import TYPE_CHECKING, Any

from calcpack import notebook
from calcpack.errors import Problem, SheetError
from calcpack.folding import folded
from calcpack.scheduled import Scheduled
from calcpack.value import Value

if TYPE_CHECKING:
    from calcpack.members.results import CheckResult

__all__ = ["ColumnSheets"]

_SHEAR_DETAILS = ("minimum shear reinforcement", "spacing of shear reinforcement")
_SPECIAL = "special moment frame"
# Limit states of the summary, and the checks that count in each.
_LIMIT_STATES: Mapping[str, tuple[str, ...]] = {
    "axial and bending": ("axial and bending",),
    "slenderness": ("slenderness", "stability", "second-order moment"),
    "axial": ("axial strength",),
    "bars": ("reinforcement ratio", "number of bars", "bar spacing"),
    "ties": ("tie size", "tie spacing", "lateral support of bars", "spiral size", "spiral pitch", "spiral ratio"),
    "shear": ("shear", "section in shear", "biaxial shear", *_SHEAR_DETAILS),
}


@dataclass(frozen=True)
class _Done:
    """A column as it came out: its results, its verdicts, and the items that show its working."""

    row: Any
    results: Sequence[CheckResult]
    verdicts: Sequence[Value]
    items: Sequence[Mapping[str, Any]]

    @property
    def governing(self) -> CheckResult:
        """The largest ratio of a limit state of strength; a check that is not OK before any other.

        Rules of detailing are often met to the letter: a ratio of 1.0 there does not say how much a column carries.
        """
        from calcpack.members.arrangements import STRENGTH

        return max(self.results, key=lambda one: (one.verdict == "NG", one.check in STRENGTH, one.ratio or 0.0))

    def shown(self, result: CheckResult | None) -> str | Value:
        """The ratio of a check, linked to the verdict it stands in."""
        if result is None:
            return "–"
        if result.ratio is None:
            return result.verdict or "–"
        for verdict in self.verdicts:
            if isclose(float(verdict), result.ratio, rel_tol=1e-7):
                return verdict
        return f"{result.ratio:.2f}"


class ColumnSheets(Scheduled):
    """What a sheet prints of the whole column schedule."""

    def columns(self, *marks: str) -> None:
        """Summary and working of the columns of the schedule, or of those named.

        Which are worked in full is a setting of job.toml, ``[columns] worked``: every column, or of each ``group`` the
        one of the largest ratio. The others have their line in the summary, and their working in the ledger.

        Raises
        ------
        SheetError : no such mark, or no column at all
        RangeError : everything that is wrong with a row, at once
        """
        self._begin()
        done = [self._done(mark) for mark in self._chosen(marks)]
        shown_by = self._shown_by(done)
        self._summary(done, shown_by)
        self._limit_states(done)
        for one in done:
            full = shown_by[one.row.mark] == one.row.mark
            for item in one.items if full else [_line(one, shown_by[one.row.mark])]:
                notebook.show(item)

    def _chosen(self, marks: Sequence[str]) -> Sequence[str]:
        from calcpack.job import read_columns

        with notebook.reading_inputs():
            listed = [row.mark for row in read_columns(self._root)]
        if not listed:
            problem = Problem("no column is listed", "a row in inputs/columns.csv", "add the schedule")
            raise SheetError("columns", [problem], self._place())
        return marks or listed

    def _done(self, mark: str) -> _Done:
        before = len(self._values)
        with self._holding() as items:
            row, results = self._work_column(mark)
        made = list(self._values.values())[before:]
        return _Done(row, results, [value for value in made if value.entry.kind == "verdict"], items)

    def _shown_by(self, done: Sequence[_Done]) -> Mapping[str, str]:
        """For each column the one whose working is printed: itself, or the one that governs its group."""
        worst: dict[str, _Done] = {}
        if self._job.columns.worked != "every column":
            for one in done:
                group = one.row.group
                worst[group] = max(worst.get(group, one), one, key=lambda one: _severity(one.governing))
        return {one.row.mark: worst.get(one.row.group, one).row.mark if one.row.group else one.row.mark for one in done}

    def _summary(self, done: Sequence[_Done], shown_by: Mapping[str, str]) -> None:
        head = ("Column", "Section", "Bars", "Ties", "Governing check", "Combination", "Ratio", "Verdict", "Worked")
        rows = []
        for one in done:
            row, governing = one.row, one.governing
            where = "below" if shown_by[row.mark] == row.mark else f"as {shown_by[row.mark]}"
            section = f"{row.h:g} in dia." if row.b is None else f"{row.b:g} x {row.h:g} in"
            texts = (row.mark, section, row.bars.text, row.ties.text, governing.check, governing.combination or "–")
            rows.append((*texts, one.shown(governing), governing.verdict or "–", where))
        self.table(head, rows, "Columns and what governs them")

    def _limit_states(self, done: Sequence[_Done]) -> None:
        """The largest ratio of each limit state, so that it shows why the others do not govern."""
        states = {name: [_largest(one.results, name) for one in done] for name in (*_LIMIT_STATES, _SPECIAL)}
        called = {name: found for name, found in states.items() if any(found)}
        rows = [
            (one.row.mark, *(one.shown(found[number]) for found in called.values())) for number, one in enumerate(done)
        ]
        self.table(("Column", *called), rows, "Largest ratio of each limit state, over all combinations")


def _largest(results: Sequence[CheckResult], state: str) -> CheckResult | None:
    """The check of a limit state with the largest ratio; one that is not OK before any other."""
    names = _LIMIT_STATES.get(state, ())
    found = [one for one in results if one.check.split(",")[0] in names or (not names and _SPECIAL in one.check)]
    return max(found, key=_severity, default=None)


def _severity(result: CheckResult) -> tuple[bool, float]:
    return result.verdict == "NG", result.ratio or 0.0


def _line(one: _Done, shown_by: str) -> Mapping[str, Any]:
    """The working of a column that is not printed, as one line."""
    return folded(one.items, f"{one.row.mark} is worked as {shown_by} is; its {{count}} values stand in the ledger.")
