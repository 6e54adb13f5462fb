"""A table file, CSV or XLSX, as rows of text cells; what a cell may mean is not decided here."""

from __future__ import annotations

import csv
import io
import re
import warnings
import zipfile
from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date, datetime, time, timedelta
from pathlib import Path
from typing import Any

from calcpack.errors import Problem
from calcpack.job.wording import failure, read_text

__all__ = ["BadCell", "Cell", "Grid", "read_grid", "table_path"]

_LOOKALIKES = {".csv", ".tsv", ".txt", ".xls", ".xlsx", ".xlsm", ".xlsb", ".ods"}
_FORMULA = re.compile(rb"<(?:\w+:)?f[\s/>]")


@dataclass(frozen=True)
class BadCell:
    """A cell of a spreadsheet that holds neither text nor number: what it shows, and what to do about it."""

    text: str
    remedy: str


Cell = str | BadCell
Grid = list[list[Cell]]


def table_path(root: Path, stem: str) -> Path | None:
    """The file of a table of the job folder `root`: ``inputs/STEM.csv`` or ``.xlsx``; ``None`` where it has none.

    Raises
    ------
    TableError : both exist, or a file that looks like the table has a name that would be passed over
    """
    folder = root / "inputs"
    names = sorted(path.name for path in folder.iterdir()) if folder.is_dir() else []
    alike = [name for name in names if Path(name).stem.casefold() == stem and Path(name).suffix.lower() in _LOOKALIKES]
    allowed = [f"{stem}.csv", f"{stem}.xlsx"]
    problems = [
        Problem(f"inputs/{name}", f"inputs/{stem}.csv or inputs/{stem}.xlsx", "save it under that name and kind")
        for name in alike
        if name not in allowed
    ]
    found = [name for name in alike if name in allowed]
    if len(found) > 1:
        problems.append(Problem(f"inputs/{found[0]} and inputs/{found[1]}", "one of the two", "remove the stale one"))
    if problems:
        raise failure(f"inputs/{stem}", problems)
    return folder / found[0] if found else None


def read_grid(path: Path, file: str) -> Grid:
    """All rows of a table file, blank ones included, so that row numbers are those a spreadsheet shows.

    Raises
    ------
    TableError : the file is not what its name says, or cannot be read
    """
    return _xlsx(path, file) if path.suffix == ".xlsx" else _csv(path, file)


def _csv(path: Path, file: str) -> Grid:
    rows: Grid = []
    text = io.StringIO(read_text(path, file), newline="")
    try:
        for row in csv.reader(text, strict=True, skipinitialspace=True):
            rows.append([cell.strip() for cell in row])
    except csv.Error as error:
        where, allowed = f"{file}, row {len(rows) + 1}", 'cells as in CSV: "a ""quoted"" text"'
        raise failure(file, [Problem(f"broken quoting ({error})", allowed, "close the quotes", where)]) from error
    return rows


def _xlsx(path: Path, file: str) -> Grid:
    from openpyxl import load_workbook

    try:
        with warnings.catch_warnings():
            # Validation lists and the like are not needed to read values.
            warnings.simplefilter("ignore")
            values = _sheet(load_workbook(path, read_only=True, data_only=True))
            if not _has_formulas(path):
                return [[_cell(cell.value, cell.data_type) for cell in row] for row in values]
            formulas = _sheet(load_workbook(path, read_only=True))
            return [
                [_formula_cell(*pair) for pair in zip(*rows, strict=True)]
                for rows in zip(values, formulas, strict=True)
            ]
    except Exception as error:
        # A damaged workbook fails in any of a dozen ways, from the archive to its XML.
        found, remedy = f"not a readable workbook ({type(error).__name__})", "save it again as XLSX, or as CSV"
        raise failure(file, [Problem(found, "an XLSX workbook without a password", remedy, file)]) from error


def _sheet(workbook: Any) -> Iterator[Any]:
    sheet = workbook.worksheets[0]
    # Exporters write wrong extents; the rows themselves are the truth.
    sheet.reset_dimensions()
    yield from sheet.iter_rows()
    workbook.close()


def _has_formulas(path: Path) -> bool:
    with zipfile.ZipFile(path) as archive:
        sheets = [name for name in archive.namelist() if name.startswith("xl/worksheets/") and name.endswith(".xml")]
        return any(_FORMULA.search(archive.read(name)) for name in sheets)


def _formula_cell(value: Any, formula: Any) -> Cell:
    if value.value is None and formula.value is not None:
        text = getattr(formula.value, "text", formula.value)
        return BadCell(str(text), "the formula has no stored result: open the file in a spreadsheet and save it")
    return _cell(value.value, value.data_type)


def _cell(value: object, kind: str) -> Cell:
    if value is None:
        return ""
    if kind == "e":
        return BadCell(str(value), "mend the formula that gives this error")
    if isinstance(value, (date, datetime, time, timedelta)):
        return BadCell(f"{value} (a date or time)", "format the cell as text or number and enter it again")
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, float) and value.is_integer() and abs(value) < 1e15:
        return str(int(value))
    return str(value).strip()
