"""The checks of a job's schedules, for the command line and the gate."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any, TypeVar

from calcpack.aci318.editions import edition
from calcpack.errors import InputError, TableError
from calcpack.job import Job, match, match_stories, read_columns, read_forces, read_stories, read_terminations
from calcpack.members import anchorage, column
from calcpack.members.column_loads import combined
from calcpack.members.results import CheckResult
from calcpack.members.termination import KINDS

__all__ = ["JobChecks", "attempt", "check_members", "raise_noted", "rows_of"]


@dataclass(frozen=True)
class JobChecks:
    """Results of every check of the schedules, and what members owe beyond them as (text, file) pairs.

    Attributes
    ----------
    columns, terminations : the file of each mark
    """

    results: tuple[CheckResult, ...]
    owed: tuple[tuple[str, str], ...]
    columns: Mapping[str, str] = field(default_factory=dict)
    terminations: Mapping[str, str] = field(default_factory=dict)

    def failed(self) -> Sequence[CheckResult]:
        """The checks that are not OK."""
        return [result for result in self.results if result.verdict == "NG"]

    def where(self, result: CheckResult) -> str:
        """The table a result comes from."""
        return (self.terminations if result.check in KINDS else self.columns)[result.mark]


def check_members(job: Job) -> JobChecks:
    """Read the schedules and run every check.

    Raises
    ------
    TableError, RangeError : everything that is wrong in the tables, at once
    """
    code = edition(job.codes.concrete)
    errors: list[InputError] = []
    columns, forces, terminations, stories = (rows_of(errors, reader, job.root) for reader in _READERS)
    if not errors:
        attempt(errors, match, columns, forces)
        attempt(errors, match_stories, columns, stories)
    attempt(errors, lambda: job.givens)
    results: list[CheckResult] = []
    owed: list[tuple[str, str]] = []
    by_mark: dict[str, list[Any]] = {}
    for force in forces:
        by_mark.setdefault(force.mark, []).append(force)
    context = column.Context(code, stories, job.columns.stiffness)
    for row in columns:
        own = by_mark.get(row.mark, [])
        factored = attempt(errors, combined, row, own, job.codes.loads, job.combining)
        if factored is not None:
            checked = attempt(errors, column.check, row, factored, context) or []
            results += checked
            owed += [(f"{row.mark}: {name}", row.file) for name in column.undecided(checked)]
            owed += [(f"{row.mark}: {name}", row.file) for name in column.owed(row, own)]
    for termination in terminations:
        found = attempt(errors, anchorage.check, termination, code)
        results += [found] if found else []
    raise_noted(errors)
    files = [{row.mark: row.file for row in rows} for rows in (columns, terminations)]
    return JobChecks(tuple(results), tuple(owed), *files)


_READERS: tuple[Callable[[Path], tuple[Any, ...]], ...] = (
    read_columns,
    read_forces,
    read_terminations,
    read_stories,
)
_NO_CHECK = "the schedules cannot be checked"
_T = TypeVar("_T")


def raise_noted(errors: Sequence[InputError]) -> None:
    """Raise what was noted, all of it as one error; nothing where nothing was."""
    if errors:
        words = "the inputs cannot be read" if any(isinstance(error, TableError) for error in errors) else _NO_CHECK
        raise errors[0] if len(errors) == 1 else type(errors[0]).gathered(words, errors)


def rows_of(errors: list[InputError], reader: Callable[[Path], tuple[Any, ...]], root: Path) -> tuple[Any, ...]:
    """The rows of a table; where some cannot be read, that is noted and the others are still checked."""
    try:
        return reader(root)
    except TableError as error:
        errors.append(error)
        return error.records


def attempt(errors: list[InputError], step: Callable[..., _T], *arguments: Any) -> _T | None:
    """Take a step, or note why it cannot be taken, so that what is wrong is told all at once."""
    try:
        return step(*arguments)
    except InputError as error:
        errors.append(error)
        return None
