from __future__ import annotations

import re
import zipfile
from collections.abc import Callable
from datetime import date, datetime, time
from pathlib import Path

import pytest

from calcpack.errors import TableError
from calcpack.job.cells import BadCell, read_grid, table_path

Put = Callable[..., Path]


def grid(root: Path, name: str = "bars.csv") -> list[list[str | BadCell]]:
    return read_grid(root / "inputs" / name, f"inputs/{name}")


@pytest.mark.parametrize("mark", [b"", b"\xef\xbb\xbf"])
@pytest.mark.parametrize("newline", [b"\n", b"\r\n", b"\r"])
def test_csv_with_or_without_byte_order_mark(job_root: Path, mark: bytes, newline: bytes) -> None:
    lines = [b"mark,location", 'C1,"Küche, ""north"" wall"'.encode(), b"", b"# C2 , x"]
    (job_root / "inputs" / "bars.csv").write_bytes(mark + newline.join(lines))
    assert grid(job_root) == [["mark", "location"], ["C1", 'Küche, "north" wall'], [], ["# C2", "x"]]


def test_csv_inch_marks_and_blanks_before_quotes(put: Put) -> None:
    assert grid(put("bars.csv", 'C1, "a, b",12" slab\n')) == [["C1", "a, b", '12" slab']]


@pytest.mark.parametrize(("text", "row"), [('a,b\nC1,"open\nC2,x\n', 2), ('"a"b,c\n', 1)])
def test_csv_broken_quotes(put: Put, text: str, row: int) -> None:
    with pytest.raises(TableError, match=rf"broken quoting.*close the quotes  \[inputs/bars\.csv, row {row}\]"):
        grid(put("bars.csv", text))


@pytest.mark.parametrize("encoding", ["cp1252", "utf-16"])
def test_csv_in_another_encoding(job_root: Path, encoding: str) -> None:
    (job_root / "inputs" / "bars.csv").write_bytes("Küche".encode(encoding))
    with pytest.raises(TableError, match=r"byte [12] is not UTF-8 .*save the file again.*\[inputs/bars\.csv\]"):
        grid(job_root)


def test_csv_that_is_a_folder(job_root: Path) -> None:
    (job_root / "inputs" / "bars.csv").mkdir()
    with pytest.raises(TableError, match=r"the file cannot be read \(Is a directory\)"):
        grid(job_root)


def test_xlsx_gives_the_texts_of_the_first_worksheet(put_xlsx: Put) -> None:
    rows = [["mark", "f_c [psi]"], [101, 4000.0], ["C2 ", 0.1], [], [True, False], [None, 1e16], ["#8", 2.5]]
    found = grid(put_xlsx("bars.xlsx", rows), "bars.xlsx")
    assert [[cell for cell in row if cell] for row in found] == [
        ["mark", "f_c [psi]"],
        ["101", "4000"],
        ["C2", "0.1"],
        [],
        ["yes", "no"],
        ["1e+16"],
        ["#8", "2.5"],
    ]


@pytest.mark.parametrize("value", [date(2026, 1, 2), datetime(2026, 1, 2, 3, 4), time(3, 4)])
def test_xlsx_dates_are_neither_text_nor_number(put_xlsx: Put, value: object) -> None:
    ((cell,),) = grid(put_xlsx("bars.xlsx", [[value]]), "bars.xlsx")
    assert isinstance(cell, BadCell)
    assert cell.text.endswith("(a date or time)")
    assert cell.remedy == "format the cell as text or number and enter it again"


def test_xlsx_formula_error_is_bad(put_xlsx: Put) -> None:
    found = grid(put_xlsx("bars.xlsx", [["#DIV/0!", 1]]), "bars.xlsx")
    assert found == [[BadCell("#DIV/0!", "mend the formula that gives this error"), "1"]]


def test_xlsx_formula_without_a_stored_result_is_bad(put_xlsx: Put) -> None:
    found = grid(put_xlsx("bars.xlsx", [["C1", "=2000*2"], [1]]), "bars.xlsx")
    remedy = "the formula has no stored result: open the file in a spreadsheet and save it"
    assert found[0] == ["C1", BadCell("=2000*2", remedy)]


@pytest.mark.parametrize(
    ("stored", "expected"),
    [("<v>4000</v>", "4000"), ("<v>4000.0</v>", "4000"), ("<v>0</v>", "0")],
)
def test_xlsx_formula_with_a_stored_result_is_its_value(put_xlsx: Put, stored: str, expected: str) -> None:
    root = put_xlsx("plain.xlsx", [["C1", "=2000*2"]])
    source, target = root / "inputs" / "plain.xlsx", root / "inputs" / "bars.xlsx"
    with zipfile.ZipFile(source) as old, zipfile.ZipFile(target, "w") as new:
        for name in old.namelist():
            text = old.read(name)
            if name == "xl/worksheets/sheet1.xml":
                text, count = re.subn(rb"<v ?/>|<v></v>", stored.encode(), text)
                assert count == 1
            new.writestr(name, text)
    assert grid(root, "bars.xlsx") == [["C1", expected]]


def test_xlsx_without_a_cell_has_no_rows(put_xlsx: Put) -> None:
    assert grid(put_xlsx("bars.xlsx", []), "bars.xlsx") == []


def test_xlsx_that_is_none(put: Put) -> None:
    with pytest.raises(
        TableError, match=r"not a readable workbook \(BadZipFile\)  an XLSX workbook without a password"
    ):
        grid(put("bars.xlsx", "mark,f_c [psi]\n"), "bars.xlsx")


def test_both_kinds_of_a_table(put: Put, put_xlsx: Put) -> None:
    put("bars.csv", "mark\n")
    root = put_xlsx("bars.xlsx", [["mark"]])
    with pytest.raises(
        TableError, match=r"inputs/bars\.csv and inputs/bars\.xlsx  one of the two: remove the stale one"
    ):
        table_path(root, "bars")


@pytest.mark.parametrize("name", ["bars.xls", "Bars.csv", "bars.CSV", "bars.ods", "bars.tsv"])
def test_a_name_that_would_be_passed_over(put: Put, name: str) -> None:
    with pytest.raises(TableError, match=rf"inputs/{name}  inputs/bars\.csv or inputs/bars\.xlsx: save it under that"):
        table_path(put(name, "mark\n"), "bars")


def test_other_files_beside_the_table(put: Put) -> None:
    put("bars.pdf", "a scan")
    put("bars2.csv", "x")
    root = put("bars.csv", "mark\n")
    assert table_path(root, "bars") == root / "inputs" / "bars.csv"
    assert table_path(root, "forces") is None
