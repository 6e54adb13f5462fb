"""The header of a table: what a column may hold, and which column of a file is which, in which unit."""

from __future__ import annotations

import re
from collections.abc import Callable, Sequence
from dataclasses import dataclass, replace
from typing import Any

from calcpack.errors import Problem, UnitError
from calcpack.job.cells import BadCell, Cell
from calcpack.job.wording import did_you_mean, failure, one_of, shown
from calcpack.units import ANGLE, RATIO, Dimension, dimension_of, display_unit, factor, split_header

__all__ = ["Column", "Header", "Heading", "read_header"]


@dataclass(frozen=True)
class Column:
    """What a column holds.

    Attributes
    ----------
    symbol : its header, without the unit
    dimension : of a quantity or ratio; ``None`` for text
    required : the column has to be there, and every cell filled
    default : what an empty or absent cell means
    choices : the texts allowed, where only some are
    parse : turns a text into its meaning, or raises ValueError with what is wrong with it
    allowed : how an error describes what `parse` accepts
    above, least : a number lies above the one, and is not less than the other, in coherent units
    """

    symbol: str
    dimension: Dimension | None = None
    required: bool = False
    default: Any = None
    choices: tuple[str, ...] = ()
    parse: Callable[[str], Any] | None = None
    allowed: str = "a text"
    above: float | None = None
    least: float | None = None

    @property
    def header(self) -> str:
        """The column's header with the unit results of this kind are shown in, as an example."""
        unit = self.unit
        return f"{self.symbol} [{unit}]" if unit else self.symbol

    @property
    def unit(self) -> str:
        """A unit this column may have, empty where it has none."""
        bare = self.dimension is None or (self.dimension.powers == RATIO.powers and self.dimension != ANGLE)
        return "" if bare or self.dimension is None else display_unit(self.dimension)


@dataclass(frozen=True)
class Heading:
    """A column of a file: its position, its header as written, its unit and how many coherent units that is."""

    position: int
    text: str
    column: Column
    unit: str = ""
    size: float = 1.0

    @property
    def allowed(self) -> str:
        """What a cell below may hold, as an error says it."""
        column = self.column
        if column.dimension is None:
            return one_of(column.choices) if column.choices else column.allowed
        bounds = [(column.above, "above"), (column.least, "not below")]
        limits = [f"{word} {limit:g}" for limit, word in bounds if limit is not None]
        return ", ".join([f"a number [{self.unit}]" if self.unit else "a number", *limits])


@dataclass(frozen=True)
class Header:
    """The first row of a file: the columns that can be read, the symbols it names, and what is wrong with it."""

    headings: tuple[Heading, ...]
    symbols: frozenset[str]
    problems: tuple[Problem, ...]
    width: int


class _Wrong(Exception):
    """What is wrong with one header cell."""

    def __init__(self, given: str, allowed: str, remedy: str) -> None:
        self.problem = Problem(given, allowed, remedy)
        super().__init__(given)


def read_header(cells: Sequence[Cell], columns: Sequence[Column], file: str) -> Header:
    """Find the columns of a file by its first row.

    Raises
    ------
    TableError : no header at all, or one that is not separated by commas; other problems are returned
    """
    where = f"{file}, row 1"
    if not cells:
        example = ",".join(column.header for column in columns if column.required)
        raise failure(file, [Problem("row 1 is empty", f"a header such as {example}", "", where)])
    if len(cells) == 1 and (mark := re.search(r"[;\t]", str(cells[0]))):
        raise failure(file, [Problem(f"columns separated by {mark[0]!r}", "by ','", "export with commas", where)])
    headings: list[Heading] = []
    symbols: list[str] = []
    problems: list[Problem] = []
    for position, cell in enumerate(cells):
        text = cell.text if isinstance(cell, BadCell) else cell
        try:
            heading = _named(position, text, columns)
            symbols.append(heading.column.symbol)
            if symbols.count(symbols[-1]) > 1:
                raise _Wrong(f"column {symbols[-1]!r} stands twice", "each column once", "remove one")
            headings.append(_sized(heading))
        except _Wrong as wrong:
            problems.append(replace(wrong.problem, where=where))
    for column in columns:
        if column.required and column.symbol not in symbols:
            problems.append(Problem(f"column {column.header!r} is missing", "every required column", "add it", where))
    return Header(tuple(headings), frozenset(symbols), tuple(problems), len(cells))


def _named(position: int, text: str, columns: Sequence[Column]) -> Heading:
    known = {column.symbol: column for column in columns}
    try:
        symbol, unit = split_header(text)
    except UnitError as error:
        raise _wrong(f"column {shown(text)}", error) from error
    if not symbol:
        raise _Wrong(f"column {position + 1} has no name", "a name over every column", "name it or remove it")
    if symbol not in known:
        allowed = "one of " + ", ".join(column.header for column in columns)
        raise _Wrong(f"unknown column {shown(text)}", allowed, did_you_mean(symbol, list(known)) or "remove it")
    return Heading(position, text, known[symbol], unit)


def _wrong(name: str, error: UnitError) -> _Wrong:
    problem = error.problems[0]
    given = problem.given if problem.given.startswith("column") else f"{name}: {problem.given}"
    return _Wrong(given, problem.allowed, problem.remedy)


def _sized(heading: Heading) -> Heading:
    """The heading with the size of its unit, where the unit fits the column."""
    column, dimension, name = heading.column, heading.column.dimension, f"column {shown(heading.text)}"
    if dimension is None or not column.unit:
        if heading.unit:
            raise _Wrong(f"{name} has a unit", "a column without a unit", f"head it {column.symbol!r}")
        return heading
    allowed, remedy = f"the unit of a {dimension.name}", f"head it e.g. {column.header!r}"
    if not heading.unit:
        raise _Wrong(f"{name} has no unit", allowed, remedy)
    try:
        found, size = dimension_of(heading.unit), factor(heading.unit)
    except UnitError as error:
        raise _wrong(name, error) from error
    if found.powers != dimension.powers:
        raise _Wrong(f"{name} ({found.name})", allowed, remedy)
    return replace(heading, size=size)
