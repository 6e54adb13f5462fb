"""The anchorage schedule on sheets: a line for every termination, full working where it governs or is asked for.

Terminations that are not printed in full are worked all the same: their entries stand in the ledger.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from calcpack import notebook
from calcpack.errors import Problem, SheetError
from calcpack.folding import folded
from calcpack.scheduled import Scheduled, SheetPad
from calcpack.value import Value

__all__ = ["AnchorageSheets"]


# Columns of the table of options that are sentences: they stand below it.
_SAID = ("Applied", "Not applied", "To be stated for less")


@dataclass(frozen=True)
class _Done:
    """A termination as it came out: its length, its verdict, and the items that show its working."""

    row: Any
    required: Value
    verdict: Value | None
    items: Sequence[Mapping[str, Any]]

    @property
    def severity(self) -> float:
        """How much of the available length is required; 0 where none is stated."""
        return float(self.verdict) if self.verdict is not None else 0.0


class AnchorageSheets(Scheduled):
    """What a sheet prints of the whole anchorage schedule, and of the ways to anchor one bar."""

    def terminations(self, *marks: str, worked: Sequence[str] = ()) -> None:
        """Summary of the terminations of the schedule, or of those named, and full working of some.

        Parameters
        ----------
        worked : marks worked in full, beside the one of the largest ratio

        Raises
        ------
        SheetError : no such mark, or no termination at all
        RangeError : everything that is wrong with a row, at once
        """
        chosen = self._marks(marks)
        self._refuse_others(worked, chosen)
        self._begin()
        done = [self._worked_out(mark) for mark in chosen]
        governing = max(done, key=lambda one: one.severity)
        self._lines(done)
        for one in done:
            if one is governing or one.row.mark in worked:
                for item in one.items:
                    notebook.show(item)
            else:
                notebook.show(folded(one.items, f"{one.row.mark}: its {{count}} values stand in the ledger."))

    def options(self, mark: str, worked: Sequence[str] = ()) -> None:
        """What each way of anchoring the bar of a row needs, and which of them fit its available length.

        Parameters
        ----------
        worked : kinds worked in full, e.g. ``("hook 90",)``

        Raises
        ------
        SheetError : no such mark
        RangeError : everything that is wrong with the row, at once
        """
        from calcpack.job import read_terminations
        from calcpack.members.anchorage_options import HEAD, option_cells, work_options

        with notebook.reading_inputs():
            row = self._row("anchorage", mark, read_terminations(self._root))
        self._head("anchorage", [row], f"{row.mark}: ways to anchor the #{row.bar} bar")
        with self._holding() as items:
            found = work_options(SheetPad(self), row, self.code)
        self._refuse_others(worked, [one.option.kind for one in found])
        rows = [option_cells(one) for one in found]
        places = [place for place, name in enumerate(HEAD) if name not in _SAID]
        shown_cells = [[cells[place] for place in places] for cells in rows]
        self.table([HEAD[place] for place in places], shown_cells, f"Ways to anchor the bar of {row.mark}")
        sheet: Any = self
        for cells in rows:
            said = [f"{name.lower()}: {cells[HEAD.index(name)]}" for name in _SAID if cells[HEAD.index(name)] != "–"]
            if said:
                sheet._note("reason", [f"{cells[0].capitalize()}; {'; '.join(said)}."])
        for text, part in _by_heading(items).items():
            full = not text or text.partition(": ")[2] in worked
            shown = part if full else [folded(part, f"{text}: {{count}} values in the ledger.")]
            for item in shown:
                notebook.show(item)

    def _marks(self, marks: Sequence[str]) -> Sequence[str]:
        from calcpack.job import read_terminations

        with notebook.reading_inputs():
            listed = [row.mark for row in read_terminations(self._root)]
        if not listed:
            problem = Problem("no termination is listed", "a row in inputs/anchorage.csv", "add the schedule")
            raise SheetError("terminations", [problem], self._place())
        return marks or listed

    def _refuse_others(self, worked: Sequence[str], known: Sequence[str]) -> None:
        problems = [
            Problem(f"worked: {name!r}", f"one of {', '.join(known)}", "") for name in worked if name not in known
        ]
        if problems:
            raise SheetError("full working", problems, self._place())

    def _worked_out(self, mark: str) -> _Done:
        before = len(self._values)
        with self._holding() as items:
            row, required = self._work_termination(mark, figure=True)
        made = list(self._values.values())[before:]
        verdicts = [value for value in made if value.entry.kind == "verdict"]
        return _Done(row, required, max(verdicts, key=float, default=None), items)

    def _lines(self, done: Sequence[_Done]) -> None:
        head = ("Mark", "Kind", "Bar", "Member", "Location", "Required", "Available", "Ratio", "Verdict")
        rows: list[tuple[str | Value, ...]] = []
        for one in done:
            row = one.row
            available = "–" if row.available is None else f"{row.available:g} in"
            ratio, word = (one.verdict, one.verdict.entry.verdict) if one.verdict is not None else ("–", "–")
            texts = (row.mark, row.kind, f"#{row.bar}", row.member or "–", row.location or "–")
            rows.append((*texts, one.required, available, ratio, word))
        self.table(head, rows, "Terminations, lengths required and available")


def _by_heading(items: Sequence[Mapping[str, Any]]) -> dict[str, list[Mapping[str, Any]]]:
    """Items under the heading that stands above them; those before the first under an empty one."""
    parts: dict[str, list[Mapping[str, Any]]] = {}
    heading = ""
    for item in items:
        heading = item["text"] if item["type"] == "heading" else heading
        parts.setdefault(heading, []).append(item)
    return parts
