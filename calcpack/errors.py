"""The errors calcpack raises, one small tree.

    CalcpackError
    ├── InputError           something the user wrote is wrong; carries every problem at once
    │   ├── UnitError        a missing, unknown or dimensionally wrong unit
    │   ├── RangeError       a value outside the range its clause allows
    │   ├── TableError       a row, column or key of a job's input files
    │   └── SheetError       a cell of a notebook
    │       └── NeedsSheet   the sheet it takes a value from has not run yet
    ├── FormulaError         a formula is written in a way that cannot run or be typeset
    │   └── LayoutError      the typeset line does not compute what the function computes
    ├── LedgerError          an entry without a source, an unknown name, a circular reference
    └── RefusedError         a request that would break a promise (an issued letter, a full folder)

Every message says what was given, what is allowed, who says so and what to do.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, replace
from typing import Any

__all__ = [
    "CalcpackError",
    "FormulaError",
    "InputError",
    "LayoutError",
    "LedgerError",
    "NeedsSheet",
    "Problem",
    "RangeError",
    "RefusedError",
    "SheetError",
    "TableError",
    "UnitError",
]


@dataclass(frozen=True)
class Problem:
    """One thing that is wrong.

    Attributes
    ----------
    given : what was found, with its name and unit, e.g. ``f_c = 40 psi``
    allowed : what is allowed, and who says so, e.g. ``2,500 psi and up (ACI 318-19 19.2.1.1)``
    remedy : what to do about it, or an empty string
    where : file and row, or notebook and cell, or an empty string
    """

    given: str
    allowed: str
    remedy: str = ""
    where: str = ""

    def line(self, width: int = 0) -> str:
        """The problem as one line of text, `given` padded to `width` characters."""
        tail = f": {self.remedy}" if self.remedy else ""
        place = f"  [{self.where}]" if self.where else ""
        return f"{self.given:<{width}}  {self.allowed}{tail}{place}"


class CalcpackError(Exception):
    """Base of everything calcpack raises on purpose; the command line prints it without a traceback."""


class InputError(CalcpackError):
    """Something the user wrote is wrong. `subject` names it, `problems` lists everything found."""

    def __init__(self, subject: str, problems: Iterable[Problem], where: str = "") -> None:
        self.subject = subject
        self.problems = tuple(problems)
        self.where = where
        super().__init__(self._message())

    def _message(self) -> str:
        width = min(44, max((len(problem.given) for problem in self.problems), default=0))
        lines = [f"  {problem.line(width)}" for problem in self.problems]
        return "\n".join([self.subject, *lines, *([self.where] if self.where else [])])

    def at(self, where: str) -> InputError:
        """The same error, with the place where it happened (file and row, notebook and cell)."""
        return type(self)(self.subject, self.problems, where)

    @classmethod
    def gathered(cls, subject: str, errors: Iterable[InputError]) -> InputError:
        """One error that holds the problems of several, each keeping its place."""
        problems = [
            problem if problem.where else replace(problem, where=error.where)
            for error in errors
            for problem in error.problems
        ]
        return cls(subject, problems)


class UnitError(InputError):
    """A unit is missing, unknown, or of the wrong dimension."""


class RangeError(InputError):
    """A value lies outside the range that its clause or nature allows."""


class TableError(InputError):
    """A file of the job folder holds something that cannot be used.

    `records` are the rows that can be used all the same, so that what a clause refuses in them is told as well.
    """

    records: tuple[Any, ...] = ()


class SheetError(InputError):
    """A cell of a notebook asks for something that cannot be done."""


class NeedsSheet(SheetError):
    """A cell takes a value from a sheet whose results are not there; `sheet` names it."""

    sheet = ""


class FormulaError(CalcpackError):
    """A formula is written in a way that cannot be run or typeset."""


class LayoutError(FormulaError):
    """The typeset form of a line does not compute what the function computes."""


class LedgerError(CalcpackError):
    """The ledger would not be true: a value without a source, an unknown name, a circular reference."""


class RefusedError(CalcpackError):
    """A request is refused because carrying it out would break a promise to whoever relies on the package."""
