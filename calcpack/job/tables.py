"""Tables whose headers carry units: a list of columns says what a file may hold, a reader returns rows or all errors.

A quantity's column is headed ``symbol [unit]``; any unit of the right dimension is converted to inch, pound and psi.
"""

from __future__ import annotations

import math
import re
from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

from calcpack.errors import Problem
from calcpack.job.cells import BadCell, Cell, read_grid, table_path
from calcpack.job.headings import Column, Header, Heading, read_header
from calcpack.job.wording import did_you_mean, failure, hidden_character, shown

__all__ = ["Column", "Row", "Rule", "Table", "read_table", "repeated", "yes_no"]

# Thousands separators only in the full pattern: "1,5" is a decimal comma and no number here.
_NUMBER = re.compile(r"[-+]?(?:[0-9]{1,3}(?:,[0-9]{3})+(?:\.[0-9]*)?|[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][-+]?[0-9]+)?")
_YES_NO = {"yes": True, "true": True, "1": True, "no": False, "false": False, "0": False}


@dataclass(frozen=True)
class Row:
    """A row of a table: its values by symbol, and where it stands.

    A symbol is missing from `values` where its cell was wrong, and ``None`` or the default where it was empty.
    `sizes` are the coherent units in one unit of each column.
    """

    file: str
    row: int
    values: dict[str, Any]
    sizes: Mapping[str, float] = field(default_factory=dict)

    @property
    def where(self) -> str:
        """The place of the row: ``inputs/anchorage.csv, row 14``."""
        return f"{self.file}, row {self.row}"

    def blank(self, symbol: str) -> bool:
        """Whether the cell was left empty and has no default; a wrong cell is not blank."""
        return symbol in self.values and self.values[symbol] is None

    def filled(self, symbol: str) -> bool:
        """Whether the cell holds a usable value."""
        return self.values.get(symbol) is not None

    def problem(self, given: str, allowed: str, remedy: str = "") -> Problem:
        """A problem of this row."""
        return Problem(given, allowed, remedy, self.where)


@dataclass(frozen=True)
class Table:
    """A file that has been read.

    Attributes
    ----------
    file : its name below the job folder
    rows : those that are not blank
    symbols : the columns its header names
    sizes : how many coherent units one unit of a column makes, by symbol, where the unit is right
    """

    file: str
    rows: tuple[Row, ...]
    symbols: frozenset[str]
    sizes: dict[str, float]

    def problem(self, given: str, allowed: str, remedy: str = "") -> Problem:
        """A problem of the header."""
        return Problem(given, allowed, remedy, f"{self.file}, row 1")


Rule = Callable[[Table], Iterable[Problem]]


def yes_no(text: str) -> bool:
    """The meaning of a yes/no cell: yes, no, true, false, 1, 0, in any case.

    Raises
    ------
    ValueError : anything else
    """
    if text.lower() not in _YES_NO:
        raise ValueError("write yes or no")
    return _YES_NO[text.lower()]


def read_table(root: Path, stem: str, columns: Sequence[Column], rule: Rule | None = None) -> Table | None:
    """Read ``inputs/STEM.csv`` or ``.xlsx`` of the job folder `root`; ``None`` where there is neither.

    Parameters
    ----------
    root : the job folder
    stem : the table's name
    columns : what it may hold
    rule : finds what is wrong between cells; it sees every row, with the wrong cells left out

    Raises
    ------
    TableError : everything that is wrong with the file, header, cells and rule, at once
    """
    path = table_path(root, stem)
    if path is None:
        return None
    file = f"inputs/{path.name}"
    grid = read_grid(path, file)
    header = read_header(_trimmed(grid[0]) if grid else [], columns, file)
    problems = list(header.problems)
    defaults = {column.symbol: column.default for column in columns if column.symbol not in header.symbols}
    sizes = {heading.column.symbol: heading.size for heading in header.headings}
    rows = []
    for number, cells in enumerate(grid[1:], 2):
        if any(cells):
            row = Row(file, number, {}, sizes)
            problems.extend(_fill(row, cells, header, defaults))
            rows.append(row)
    table = Table(file, tuple(rows), header.symbols, sizes)
    problems.extend(rule(table) if rule else ())
    if problems:
        error = failure(file, problems)
        if not header.problems:
            wrong = {int(number) for problem in problems for number in re.findall(r", row (\d+)", problem.where)}
            error.records = tuple(row for row in table.rows if row.row not in wrong)
        raise error
    return table


def _trimmed(cells: list[Cell]) -> list[Cell]:
    """The cells without the empty ones a spreadsheet leaves at the end."""
    last = max((position for position, cell in enumerate(cells, 1) if cell), default=0)
    return cells[:last]


def _fill(row: Row, cells: list[Cell], header: Header, defaults: dict[str, Any]) -> list[Problem]:
    """Put the values of the cells into the row; returns what is wrong with them."""
    used = len(_trimmed(cells))
    # A workbook has no cells where a row ends early; in text a short row is one whose columns may have shifted.
    if used > header.width or (len(cells) < header.width and row.file.endswith(".csv")):
        remedy = "a text with a comma needs double quotes around it"
        found = used if used > header.width else len(cells)
        return [row.problem(f"{found} cells", f"{header.width} cells, as in the header", remedy)]
    row.values.update(defaults)
    problems = []
    for heading in header.headings:
        cell = cells[heading.position] if heading.position < len(cells) else ""
        try:
            row.values[heading.column.symbol] = _value(cell, heading)
        except ValueError as error:
            where = f"{row.where}, column {heading.text!r}"
            problems.append(Problem(_found(cell, heading), heading.allowed, str(error), where))
    return problems


def _found(cell: Cell, heading: Heading) -> str:
    symbol = heading.column.symbol
    if isinstance(cell, BadCell):
        return f"{symbol} = {cell.text}"
    return f"{symbol} = {shown(cell)}" if cell else f"{symbol} is empty"


def _value(cell: Cell, heading: Heading) -> Any:
    """The meaning of a cell; ValueError, with what to do about it, where it has none."""
    column = heading.column
    if isinstance(cell, BadCell):
        raise ValueError(cell.remedy)
    if not cell:
        if column.required:
            raise ValueError("fill the cell")
        return column.default
    if column.dimension is not None:
        return _number(cell, heading)
    if hidden := hidden_character(cell):
        raise ValueError(f"remove the control character {hidden}")
    if column.choices and cell not in column.choices:
        raise ValueError(did_you_mean(cell, column.choices) or "write one of these")
    return column.parse(cell) if column.parse else cell


def _number(cell: str, heading: Heading) -> float:
    """A number in coherent units."""
    match = _NUMBER.match(cell)
    if match is None or match.end() < len(cell):
        unit = match and cell[match.end() :].strip()[:1].isalpha()
        raise ValueError("the unit stands in the header, the cell holds the number alone" if unit else "enter a number")
    value = float(cell.replace(",", ""))
    if heading.size != 1:
        # 50.8 mm are 2 in and not 1.9999999999999998 in, which a clause that asks for 2 in would refuse.
        value = float(f"{value * heading.size:.14g}")
    if not math.isfinite(value):
        raise ValueError("enter a finite number")
    above, least = heading.column.above, heading.column.least
    if (above is not None and value <= above) or (least is not None and value < least):
        raise ValueError("correct the value")
    return value


def repeated(table: Table, symbol: str) -> list[Problem]:
    """A problem for each row whose `symbol` stands in a row before it."""
    first: dict[Any, int] = {}
    problems = []
    for row in table.rows:
        value = row.values.get(symbol)
        if value is not None and first.setdefault(value, row.row) != row.row:
            given = f"{symbol} = {shown(value)}"
            problems.append(row.problem(given, f"each {symbol} once", f"row {first[value]} has it already"))
    return problems
