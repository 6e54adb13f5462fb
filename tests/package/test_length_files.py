"""The schedule as text, CSV and XLSX: the numbers that are printed, where they may be written, and the command."""

from __future__ import annotations

import csv
import io
import re
import zipfile
from pathlib import Path
from typing import Any

import pytest
from job_samples import JOB, Shown, make_job

from calcpack import Sheet, cli
from calcpack.errors import RefusedError
from calcpack.job import load
from calcpack.members.length_notes import table_title
from calcpack.members.length_schedule import COLUMNS
from calcpack.package.length_files import schedule_of, target, to_csv, to_text, to_xlsx, write_file

LENGTHS = """
[lengths]
concrete = ["4000 psi", "5 ksi"]
grade = "60 ksi"
coating = ["none", "epoxy"]
clear_cover = "1.5 in"
clear_spacing = "2 d_b"
increment = "1/2 in"
"""
ANCHORAGE = "mark,kind,bar,f_c [psi],f_y [psi]\nT1,straight tension,#7,{},60000\n"


@pytest.fixture
def root(tmp_path: Path) -> Path:
    return make_job(tmp_path / "job", toml=JOB + LENGTHS)


def printed(root: Path, monkeypatch: pytest.MonkeyPatch) -> list[list[list[str]]]:
    """The texts of the tables that a sheet of the job prints."""
    shown = Shown(monkeypatch)
    Sheet("G-01", "Lengths", job=root).lengths()
    return [
        [[row["label"], *(cell["text"] for cell in row["cells"])] for row in item["rows"]]
        for item in shown.of("tabulated")
    ]


def rows_of(data: bytes) -> list[list[str]]:
    return list(csv.reader(io.StringIO(data.decode("utf-8"), newline="")))


def book_of(data: bytes) -> Any:
    from openpyxl import load_workbook

    return load_workbook(io.BytesIO(data))


# CSV


def test_csv_read_back_is_what_the_sheet_prints(root: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    head, *rows = rows_of(to_csv(schedule_of(load(root))))
    assert head[:5] == ["f_c [psi]", "f_y [psi]", "coating", "lambda", "bar"]
    assert head[5:-1] == [f"{one.symbol} {one.words.replace('°', '')} [in]" for one in COLUMNS]
    flat = [row for table in printed(root, monkeypatch) for row in table]
    assert [row[4] for row in rows] == [row[0] for row in flat]
    for row, on_page in zip(rows, flat, strict=True):
        assert [text or "–" for text in row[5:-1]] == [text[0] if text[0] == "–" else text for text in on_page[1:]]
    assert [row[:4] for row in rows[::11]] == [
        ["4000", "60000", "none", "1"],
        ["4000", "60000", "epoxy", "1"],
        ["5000", "60000", "none", "1"],
        ["5000", "60000", "epoxy", "1"],
    ]


def test_csv_says_why_a_cell_is_empty(root: Path) -> None:
    _, *rows = rows_of(to_csv(schedule_of(load(root))))
    notes = {row[4]: row[-1] for row in rows}
    assert notes["#11"] == ""
    assert notes["#14"].startswith("Headed bars: #11 and smaller (25.4.4.1). Tension laps: #11 and smaller (25.5.1.1).")


def test_csv_prints_no_commas_in_numbers(tmp_path: Path) -> None:
    # An increment of 12 in and weak concrete do not reach 1,000 in; a strength does.
    root = make_job(tmp_path / "job", anchorage=ANCHORAGE.format(2500))
    _, *rows = rows_of(to_csv(schedule_of(load(root))))
    assert rows[0][:2] == ["2500", "60000"]


# XLSX


def test_xlsx_read_back_is_what_the_sheet_prints(root: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    schedule = schedule_of(load(root))
    book = book_of(to_xlsx(schedule))
    tables = printed(root, monkeypatch)
    assert len(book.worksheets) == len(tables) + 1
    for sheet, table, worked in zip(book.worksheets, tables, schedule.tables, strict=False):
        title, symbols, words, *rows = sheet.iter_rows(values_only=True)
        assert title[0] == f"Development and lap lengths, in: {table_title(worked.strengths)} (ACI 318-19)"
        assert list(symbols[1:]) == [column.symbol for column in COLUMNS]
        assert list(words) == ["bar", *(column.words for column in COLUMNS)]
        found = [[cell if isinstance(cell, str) else f"{cell:,.1f}" for cell in row] for row in rows]
        assert found == table


def test_xlsx_holds_numbers_and_the_notes(root: Path) -> None:
    schedule = schedule_of(load(root))
    book = book_of(to_xlsx(schedule))
    assert isinstance(book.worksheets[0]["B4"].value, (int, float))
    assert book.worksheets[0]["B4"].number_format == "0.0"
    assert [row[1] for row in book["Notes"].iter_rows(values_only=True)] == list(schedule.notes)
    assert [sheet.title for sheet in book.worksheets][:2] == ["1 4000 psi, Gr 60, none", "2 4000 psi, Gr 60, epoxy"]


def test_names_of_worksheets_stay_short_and_apart(tmp_path: Path) -> None:
    strengths = '\n[lengths]\nconcrete = ["10000 psi"]\ngrade = ["100 ksi"]\ncoating = ["dual", "epoxy"]\n'
    root = make_job(tmp_path / "job", toml=JOB + strengths)
    names = [sheet.title for sheet in book_of(to_xlsx(schedule_of(load(root)))).worksheets]
    assert len(set(names)) == 3
    assert max(map(len, names)) <= 31


def test_the_same_job_gives_the_same_bytes(root: Path) -> None:
    first, again = (to_xlsx(schedule_of(load(root))) for _ in range(2))
    assert first == again
    assert to_csv(schedule_of(load(root))) == to_csv(schedule_of(load(root)))
    with zipfile.ZipFile(io.BytesIO(first)) as file:
        assert {item.date_time for item in file.infolist()} == {(1980, 1, 1, 0, 0, 0)}
        core = file.read("docProps/core.xml").decode()
    # Created and modified: neither is the time of the run.
    assert re.findall(r"<dcterms:(\w+)[^>]*>([^<]*)", core) == [
        ("created", "2000-01-01T00:00:00Z"),
        ("modified", "2000-01-01T00:00:00Z"),
    ]


# Text


def test_text_has_a_line_a_bar_and_the_notes(root: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    schedule = schedule_of(load(root))
    lines = to_text(schedule).split("\n")
    assert lines[:2] == ["26-044  Cold store at Marl Hythe  (ACI 318-19)", "Development and lap lengths, in"]
    flat = [row for table in printed(root, monkeypatch) for row in table]
    assert [line.split() for line in lines if line.startswith("#")] == [" ".join(row).split() for row in flat]
    assert lines[-len(schedule.notes) :] == [f"{number}. {note}" for number, note in enumerate(schedule.notes, 1)]


# Where a file may be written


@pytest.mark.parametrize("name", ["draft/lengths.csv", "lengths.csv", "./notes.CSV", "draft/../notes.csv"])
def test_files_inside_the_job(root: Path, name: str) -> None:
    assert target(root, name, ".csv") == (root / name).resolve()


@pytest.mark.parametrize(
    ("name", "reason"),
    [
        ("../lengths.csv", "outside the job folder"),
        ("draft/../../lengths.csv", "outside the job folder"),
        ("/lengths.csv", "outside the job folder"),
        ("lengths.txt", r"has to end in \.csv"),
        ("job.toml", r"has to end in \.csv"),
        ("", r"has to end in \.csv"),
        ("inputs/columns.csv", "inputs/ holds what the job rests on"),
        ("record/issued/A/lengths.csv", "record/ holds what the job rests on"),
        ("sheets/lengths.csv", "sheets/ holds"),
        (".calcpack/lengths.csv", r"\.calcpack/ holds"),
        ("comments.csv", "belongs to the job"),
        (".csv.csv", "belongs to the job"),
        ("other/lengths.csv", "a folder that is not there"),
        ("folder.csv", "it is a folder"),
    ],
)
def test_files_that_are_not_written(root: Path, name: str, reason: str) -> None:
    (root / "folder.csv").mkdir()
    with pytest.raises(RefusedError, match=reason):
        target(root, name, ".csv")


def test_a_link_that_leads_outside_is_outside(root: Path, tmp_path: Path) -> None:
    (root / "away").symlink_to(tmp_path)
    with pytest.raises(RefusedError, match="outside the job folder"):
        target(root, "away/lengths.csv", ".csv")


def test_writing_is_one_step(root: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    path = root / "lengths.csv"
    write_file(path, b"first")

    def fail(*_: Path) -> None:
        raise OSError("cut off")

    monkeypatch.setattr(Path, "replace", fail)
    with pytest.raises(OSError, match="cut off"):
        write_file(path, b"second")
    assert path.read_bytes() == b"first"
    assert sorted(item.name for item in root.iterdir()) == ["inputs", "job.toml", "lengths.csv", "sheets"]


# The command


def run(capsys: pytest.CaptureFixture[str], *arguments: object) -> tuple[int, str, str]:
    status = cli.main([str(argument) for argument in arguments])
    told = capsys.readouterr()
    assert "Traceback" not in told.out + told.err
    return status, told.out, told.err


def files(root: Path) -> dict[str, bytes]:
    return {str(path.relative_to(root)): path.read_bytes() for path in root.rglob("*") if path.is_file()}


def test_the_command_prints_and_writes_nothing(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    before = files(root)
    status, out, err = run(capsys, "lengths", root)
    assert (status, err) == (0, "")
    assert out == to_text(schedule_of(load(root))) + "\n"
    assert files(root) == before


def test_the_command_writes_the_defaults_and_says_where(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, _ = run(capsys, "lengths", root, "--csv", "--xlsx")
    assert status == 0
    schedule = schedule_of(load(root))
    written = {"draft/lengths.csv": to_csv(schedule), "draft/lengths.xlsx": to_xlsx(schedule)}
    found = files(root)
    assert {name: found[name] for name in written} == written
    assert out.endswith("".join(f"written: {root / name}\n" for name in written))


def test_the_command_writes_to_a_file_of_the_job(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert run(capsys, "lengths", root, "--csv", "general notes.csv")[0] == 0
    assert (root / "general notes.csv").is_file()
    assert not (root / "draft").exists()


@pytest.mark.parametrize(
    "options", [["--csv", "../x.csv"], ["--csv", "--xlsx", "x.csv"], ["--csv", "a.csv", "--xlsx", "/x.xlsx"]]
)
def test_a_refused_file_means_that_none_is_written(
    root: Path, options: list[str], capsys: pytest.CaptureFixture[str]
) -> None:
    before = files(root)
    status, out, err = run(capsys, "lengths", root, *options)
    assert (status, out) == (2, "")
    assert err.startswith("RefusedError: ")
    assert files(root) == before


@pytest.mark.parametrize(
    ("toml", "rows", "message"),
    [
        (JOB, None, "no concrete and no grade to make it for"),
        (JOB, ANCHORAGE.format(2000), "no length can be given"),
        (JOB + '\n[lengths]\nincrement = "0.3 in"\n', None, "a multiple of 1/4 in"),
    ],
)
def test_wrong_input_is_status_2(
    tmp_path: Path, toml: str, rows: str | None, message: str, capsys: pytest.CaptureFixture[str]
) -> None:
    root = make_job(tmp_path / "job", toml=toml, **({"anchorage": rows} if rows else {}))
    before = files(root)
    status, out, err = run(capsys, "lengths", root, "--csv")
    assert (status, out) == (2, "")
    assert message in err
    assert files(root) == before


def test_both_editions_print_their_own(tmp_path: Path) -> None:
    # By hand: a head of #8 in 4,000 psi, 15.18 in by ACI 318-14 and 21.92 in by ACI 318-19, no condition counted.
    text = '\n[lengths]\nconcrete = "4 ksi"\ngrade = "60 ksi"\nsizes = "#8"\n'
    place = [column.name for column in COLUMNS].index("headed")
    for code, expected in (("ACI 318-14", 16.0), ("ACI 318-19", 22.0)):
        root = make_job(tmp_path / code[-2:], toml=JOB.replace("ACI 318-19", code) + text)
        (table,) = schedule_of(load(root)).tables
        assert table.rows[8][place].rounded == expected
