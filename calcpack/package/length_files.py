"""The development and lap schedule as text, CSV and XLSX: the numbers of the printed tables, for the general notes."""

from __future__ import annotations

import csv
import io
import os
import re
import zipfile
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from calcpack.aci318.editions import Edition, edition
from calcpack.errors import RefusedError
from calcpack.job import Job
from calcpack.job.length_settings import lengths_of
from calcpack.members.length_basis import Basis, Strengths
from calcpack.members.length_notes import NoteList, assumptions, dash, decimals, table_title
from calcpack.members.length_schedule import COLUMNS, LengthCell, LengthTable, state_strengths, work_lengths
from calcpack.members.pad import FloatPad
from calcpack.tabulating import fixed_text

__all__ = ["Schedule", "schedule_of", "target", "to_csv", "to_text", "to_xlsx", "write_file"]

_TITLE = "Development and lap lengths, in"
_FOLDERS = ("inputs", "sheets", "figures", "record")
_DAY = (1980, 1, 1, 0, 0, 0)


@dataclass(frozen=True)
class Schedule:
    """A worked schedule: its tables, what its lengths hold for, and its notes in order."""

    job: Job
    basis: Basis
    tables: tuple[LengthTable[float], ...]
    notes: tuple[str, ...]

    def text(self, cell: LengthCell[float]) -> str:
        """A cell as it is printed."""
        return dash(cell.notes) if cell.rounded is None else fixed_text(cell.rounded, decimals(self.basis.increment))


def schedule_of(job: Job) -> Schedule:
    """Work the schedule of a job.

    Raises
    ------
    TableError, RangeError : there is nothing to make it for, or the edition has no length for some strengths
    """
    asked, code, notes, pad = lengths_of(job), edition(job.codes.concrete), NoteList(), FloatPad()
    increment = state_strengths(pad, asked.strengths, asked.basis)
    tables = tuple(work_lengths(pad, one, asked.basis, code, notes, increment) for one in asked.strengths)
    return Schedule(job, asked.basis, tables, _notes(notes, asked.strengths, asked.basis, code))


def _notes(notes: NoteList, tables: Sequence[Strengths], basis: Basis, code: Edition) -> tuple[str, ...]:
    return (*notes.texts, *assumptions(tables, basis, code))


def to_text(schedule: Schedule) -> str:
    """The tables and the notes, for a terminal."""
    lines = [f"{schedule.job.number}  {schedule.job.title}  ({schedule.job.codes.concrete})", _TITLE]
    for table in schedule.tables:
        lines += ["", table_title(table.strengths), *_aligned([*zip(*_HEAD, strict=True), *_rows(schedule, table)])]
    return "\n".join([*lines, "", *(f"{number}. {text}" for number, text in enumerate(schedule.notes, 1))])


_HEAD = [("", "bar"), *((column.symbol, column.words) for column in COLUMNS)]


def _rows(schedule: Schedule, table: LengthTable[float]) -> Iterator[tuple[str, ...]]:
    for size, cells in table.rows.items():
        yield (f"#{size}", *map(schedule.text, cells))


def _aligned(rows: Sequence[Sequence[str]]) -> list[str]:
    widths = [max(map(len, column)) for column in zip(*rows, strict=True)]
    return ["  ".join([row[0].ljust(widths[0]), *map(str.rjust, row[1:], widths[1:])]).rstrip() for row in rows]


def to_csv(schedule: Schedule) -> bytes:
    """One row for each bar of each table; a cell without a length is empty, and the last column names its notes."""
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\r\n")
    lengths = [f"{column.symbol} {column.words.replace('°', '')} [in]" for column in COLUMNS]
    writer.writerow(["f_c [psi]", "f_y [psi]", "coating", "lambda", "bar", *lengths, "notes"])
    for table in schedule.tables:
        one = table.strengths
        stated = [f"{one.f_c:.10g}", f"{one.f_y:.10g}", one.coating, f"{one.lamb:g}"]
        for size, cells in table.rows.items():
            shown = ["" if cell.rounded is None else _plain(schedule, cell.rounded) for cell in cells]
            why = [number for cell in cells for number in cell.notes]
            said = " ".join(schedule.notes[number - 1] for number in dict.fromkeys(why))
            writer.writerow([*stated, f"#{size}", *shown, said])
    return out.getvalue().encode()


def _plain(schedule: Schedule, value: float) -> str:
    """A number without the commas of print."""
    return fixed_text(value, decimals(schedule.basis.increment)).replace(",", "")


def to_xlsx(schedule: Schedule) -> bytes:
    """A worksheet for each table, laid out as it is printed, and one of notes; the same bytes for the same job."""
    from openpyxl import Workbook

    book = Workbook()
    book.remove(book.worksheets[0])
    for number, table in enumerate(schedule.tables, 1):
        _worksheet(book.create_sheet(_name(number, table.strengths)), schedule, table)
    notes = book.create_sheet("Notes")
    notes.column_dimensions["B"].width = 110
    for number, text in enumerate(schedule.notes, 1):
        notes.append([number, text])
        notes.cell(number, 2).alignment = _wrapped()
    out = io.BytesIO()
    book.save(out)
    return _without_clock(out.getvalue())


def _wrapped() -> Any:
    from openpyxl.styles import Alignment

    return Alignment(wrap_text=True, vertical="top")


def _name(number: int, strengths: Strengths) -> str:
    """A name that a worksheet may have: short, unique, without brackets, colons and slashes."""
    return f"{number} {strengths.f_c:.0f} psi, Gr {strengths.f_y / 1000:g}, {strengths.coating}"[:31]


def _worksheet(sheet: Any, schedule: Schedule, table: LengthTable[float]) -> None:
    from openpyxl.styles import Alignment, Border, Font, Side

    sheet.append([f"{_TITLE}: {table_title(table.strengths)} ({schedule.job.codes.concrete})"])
    for head in zip(*_HEAD, strict=True):
        sheet.append(list(head))
    for size, cells in table.rows.items():
        sheet.append([f"#{size}", *(dash(cell.notes) if cell.rounded is None else cell.rounded for cell in cells)])
    places = decimals(schedule.basis.increment)
    for row in sheet.iter_rows(min_row=2, min_col=2):
        for cell in row:
            cell.alignment = Alignment(horizontal="right")
            cell.number_format = f"0.{'0' * places}" if places else "0"
    sheet.cell(1, 1).font = Font(bold=True)
    for cell in (*sheet[2], *sheet[3]):
        cell.font = Font(italic=cell.row == 2)
        cell.border = Border(bottom=Side(style="thin")) if cell.row == 3 else Border()
    for column in range(2, len(_HEAD) + 1):
        sheet.column_dimensions[sheet.cell(3, column).column_letter].width = 14
    sheet.freeze_panes = "B4"
    sheet.page_setup.orientation = "landscape"


_STAMP = re.compile(rb"(<dcterms:(created|modified)[^>]*>)[^<]*")


def _without_clock(data: bytes) -> bytes:
    """The file without the time at which it was made, which says nothing of the job."""
    out = io.BytesIO()
    with zipfile.ZipFile(io.BytesIO(data)) as old, zipfile.ZipFile(out, "w", zipfile.ZIP_DEFLATED) as new:
        for item in old.infolist():
            content = _STAMP.sub(rb"\g<1>2000-01-01T00:00:00Z", old.read(item))
            info = zipfile.ZipInfo(item.filename, _DAY)
            info.compress_type = zipfile.ZIP_DEFLATED
            new.writestr(info, content)
    return out.getvalue()


def target(root: Path, name: str, suffix: str) -> Path:
    """Where a file that the user names is written: inside the job, and not where the job keeps what it rests on.

    Raises
    ------
    RefusedError : outside the job folder, in a folder of inputs or records, or with another ending
    """
    path = (root / name).resolve()
    inside = path.is_relative_to(root.resolve())
    parts = path.relative_to(root.resolve()).parts if inside else ()
    if not inside:
        reason = "it is outside the job folder; name a file inside it, e.g. draft/lengths" + suffix
    elif path.suffix.lower() != suffix:
        reason = f"the name has to end in {suffix}"
    elif len(parts) > 1 and (parts[0] in _FOLDERS or parts[0].startswith(".")):
        reason = f"{parts[0]}/ holds what the job rests on; name a file in draft/ or beside job.toml"
    elif len(parts) == 1 and (parts[0] == "comments.csv" or parts[0].startswith(".")):
        reason = "that file belongs to the job; name another"
    elif path.is_dir() or not (path.parent.is_dir() or parts[:-1] == ("draft",)):
        reason = "it is a folder, or stands in a folder that is not there"
    else:
        return path
    raise RefusedError(f"{name} is not written: {reason}")


def write_file(path: Path, data: bytes) -> None:
    """Write a file in one step: a run that is cut off leaves the last one whole."""
    path.parent.mkdir(exist_ok=True)
    partial = path.with_name(f".{path.name}.{os.getpid()}")
    try:
        with partial.open("wb") as file:
            file.write(data)
            file.flush()
            os.fsync(file.fileno())
        partial.replace(path)
    finally:
        partial.unlink(missing_ok=True)
