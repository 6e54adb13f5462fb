"""Arrangements of bars for a column of a job, read from its tables and told on the command line."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Any

from calcpack.aci318 import columns as provisions
from calcpack.aci318.editions import edition
from calcpack.errors import InputError, Problem, TableError
from calcpack.job import ColumnRow, Job, match, match_stories, read_columns, read_forces, read_stories
from calcpack.job.wording import did_you_mean
from calcpack.members.arrangements import Arrangement, Arrangements, arrangements
from calcpack.members.column import Context
from calcpack.members.column_loads import combined
from calcpack.package.members import attempt, raise_noted, rows_of
from calcpack.units import AREA, convert, display_unit
from calcpack.value import ratio_text

__all__ = ["Arranged", "arrange", "as_table", "bars_json", "bars_text"]


@dataclass(frozen=True)
class Arranged:
    """A column of the schedule and the arrangements found for it."""

    column: ColumnRow
    found: Arrangements


def arrange(job: Job, mark: str, most: int = 10) -> Arranged:
    """Look for arrangements of the bars of one column, under the same forces as its checks.

    Raises
    ------
    TableError, RangeError : no such mark, or everything that is wrong in the tables it rests on, at once
    """
    errors: list[InputError] = []
    columns, forces, stories = (rows_of(errors, read, job.root) for read in (read_columns, read_forces, read_stories))
    raise_noted(errors)
    attempt(errors, match, columns, forces)
    attempt(errors, match_stories, columns, stories)
    raise_noted(errors)
    column = _named(mark, columns)
    own = combined(column, [force for force in forces if force.mark == mark], job.codes.loads, job.combining)
    context = Context(edition(job.codes.concrete), stories, job.columns.stiffness)
    return Arranged(column, arrangements(column, own, context, most))


def _named(mark: str, columns: Sequence[ColumnRow]) -> ColumnRow:
    for column in columns:
        if column.mark == mark:
            return column
    marks = [column.mark for column in columns]
    allowed = f"a mark of the column schedule: {', '.join(marks) or 'it has none'}"
    raise TableError("no such column", [Problem(f"mark {mark!r}", allowed, did_you_mean(mark, marks))])


def bars_json(job: Job, arranged: Arranged) -> dict[str, Any]:
    """The object of ``calcpack bars --json``; numbers are unrounded."""
    found = arranged.found
    return {
        "job": job.number,
        "concrete": job.codes.concrete,
        "mark": found.mark,
        "present": _one(found.present),
        "arrangements": [_one(one) for one in found.found],
        "fitting": found.fitting,
        "tried": found.tried,
        "rejected": dict(found.rejected),
        "notes": list(found.notes),
    }


def _one(one: Arrangement) -> dict[str, Any]:
    unit = display_unit(AREA)
    return {
        "bars": one.bars,
        "present": one.present,
        "A_st": {"value": convert(one.A_st, unit), "unit": unit},
        "rho_g": one.rho_g,
        "governing": one.governing,
        "ratio": one.ratio,
        "axial_and_bending": one.bending,
        "not_ok": list(one.failed),
        "no_verdict": list(one.undecided),
    }


def bars_text(job: Job, arranged: Arranged) -> str:
    """The present arrangement, the table of those found, what was tried, and that nothing was changed."""
    column, found = arranged.column, arranged.found
    section = f"{column.h:g} in dia." if column.b is None else f"{column.b:g} x {column.h:g} in"
    head = f"{job.number}  {job.title}  ({job.codes.concrete})"
    lines = [head, "", f"{column.mark}  {section}  {column.ties.text}", f"present: {_present(found.present)}", ""]
    lines += list(_aligned(*as_table(found))) if found.found else [_none(job, found)]
    tried = f"{found.tried} of {found.fitting} arrangements that fit were tried, the lightest first"
    lines += ["", f"{tried}{_refusals(found)}."] if found.found else []
    lines += [f"note: {note}" for note in found.notes]
    return "\n".join([*lines, "", _unchanged(column)])


def _present(one: Arrangement) -> str:
    unit = display_unit(AREA)
    ratio = f"{one.governing} {ratio_text(one.ratio)}" if one.ratio is not None else "no ratio of strength"
    failed = f"NG: {', '.join(one.failed)}" if one.failed else "no check is NG"
    return f"{one.bars}, A_st = {_area(one)} {unit}, rho_g = {one.rho_g:.4f}, {ratio}; {failed}"


def _area(one: Arrangement) -> str:
    return f"{convert(one.A_st, display_unit(AREA)):,.2f}"


def as_table(found: Arrangements) -> tuple[Sequence[str], Sequence[Sequence[str]]]:
    """Head and rows of the arrangements found, as texts.

    Checks without a verdict are named where they are not the same in every row; the notes name them all.
    """
    head = ["bars", f"A_st [{display_unit(AREA)}]", "rho_g", "ratio", "governing", "axial and bending", ""]
    common = set.intersection(*(set(one.undecided) for one in found.found)) if found.found else set()
    rows = [[*_cells(one), "; ".join(_remarks(one, common))] for one in found.found]
    return head, rows


def _cells(one: Arrangement) -> Iterator[str]:
    yield from (one.bars, _area(one), f"{one.rho_g:.4f}")
    yield "-" if one.ratio is None else ratio_text(one.ratio)
    yield one.governing or "-"
    yield "-" if one.bending is None else ratio_text(one.bending)


def _remarks(one: Arrangement, common: set[str]) -> Iterator[str]:
    if one.present:
        yield "present"
    own = [name for name in one.undecided if name not in common]
    if own:
        yield f"no verdict: {', '.join(own)}"


def _aligned(head: Sequence[str], rows: Sequence[Sequence[str]]) -> Iterator[str]:
    widths = [max(len(cell) for cell in cells) for cells in zip(head, *rows, strict=True)]
    for row in (head, *rows):
        yield "  ".join(cell.ljust(width) for cell, width in zip(row, widths, strict=True)).rstrip()


def _none(job: Job, found: Arrangements) -> str:
    if not found.fitting:
        standard = edition(job.codes.concrete).standard
        clause = provisions.bar_spacing_minimum.clause(standard).number
        return f"No bars of #5 to #18 fit within the ties of {found.mark} with the least clear spacing of {clause}."
    words = f"No arrangement of one bar size satisfies every check of {found.mark}"
    return f"{words}: {found.tried} fit and were tried{_refusals(found)}."


def _refusals(found: Arrangements) -> str:
    """How many each check refused, the most first."""
    counts = sorted(found.rejected.items(), key=lambda pair: (-pair[1], pair[0]))
    return "; not OK: " + ", ".join(f"{name} {count}" for name, count in counts) if counts else ""


def _unchanged(column: ColumnRow) -> str:
    return (
        f"Nothing was changed: to use an arrangement, write it under bars in {column.where}; rows of "
        "inputs/anchorage.csv that develop or splice these bars have to follow."
    )
