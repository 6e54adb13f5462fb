"""The checks of a job's schedules, for the command line and the gate."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

from calcpack.aci318.editions import edition
from calcpack.errors import InputError, TableError
from calcpack.job import Job, match, read_columns, read_forces, read_terminations
from calcpack.members import anchorage, column
from calcpack.members.results import CheckResult

__all__ = ["JobChecks", "check_members"]


@dataclass(frozen=True)
class JobChecks:
    """Results of every check of the schedules, and what members owe beyond them as (text, file) pairs."""

    results: tuple[CheckResult, ...]
    owed: tuple[tuple[str, str], ...]
    columns: frozenset[str]

    def failed(self) -> Sequence[CheckResult]:
        """The checks that are not OK."""
        return [result for result in self.results if result.verdict == "NG"]

    def where(self, result: CheckResult) -> str:
        """The table a result comes from."""
        return "inputs/columns.csv" if result.mark in self.columns else "inputs/anchorage.csv"


def check_members(job: Job) -> JobChecks:
    """Read the schedules and run every check.

    Raises
    ------
    TableError, RangeError : everything that is wrong in the tables, at once
    """
    code = edition(job.codes.concrete)
    columns, forces, terminations = _tables(job)
    errors: list[InputError] = []
    results: list[CheckResult] = []
    owed: list[tuple[str, str]] = []
    for row in columns:
        own = [force for force in forces if force.mark == row.mark]
        try:
            results += column.check(row, own, code)
            owed += [(f"{row.mark}: {name}", "inputs/columns.csv") for name in column.owed(row, own)]
        except InputError as error:
            errors.append(error)
    for termination in terminations:
        try:
            results.append(anchorage.check(termination, code))
        except InputError as error:
            errors.append(error)
    if errors:
        raise errors[0] if len(errors) == 1 else type(errors[0]).gathered("the schedules cannot be checked", errors)
    return JobChecks(tuple(results), tuple(owed), frozenset(row.mark for row in columns))


def _tables(job: Job) -> tuple[Any, Any, Any]:
    tables: list[Any] = []
    errors: list[InputError] = []
    for reader in (read_columns, read_forces, read_terminations):
        try:
            tables.append(reader(job.root))
        except InputError as error:
            errors.append(error)
    if not errors:
        try:
            match(tables[0], tables[1])
        except InputError as error:
            errors.append(error)
    if errors:
        raise errors[0] if len(errors) == 1 else TableError.gathered("the inputs cannot be read", errors)
    return tables[0], tables[1], tables[2]
