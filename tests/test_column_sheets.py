"""The column schedule on a sheet: the summary, what is printed in full, and what stands in the ledger all the same."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path
from typing import Any

import pytest
from job_samples import JOB, Shown, make_job

from calcpack import Sheet, notebook
from calcpack.errors import RangeError, SheetError
from calcpack.job import load
from calcpack.ledger import Entry, Ledger, replay
from calcpack.package.members import check_members
from calcpack.package.reads import Inputs

COLUMNS = """mark,shape,b [in],h [in],bars,ties,cover [in],f_c [psi],f_y [psi],l_u [ft],frame,group,source
C1,rectangular,16,16,8-#8 (3x3),#3@14,1.5,4000,60000,,,edge,S-401
C2,rectangular,16,16,8-#8 (3x3),#3@14,1.5,4000,60000,,,edge,S-401
C3,circular,,20,8-#8,#4 spiral@2.5,1.5,5000,60000,20,nonsway,,S-402
C4,rectangular,16,16,8-#8 (3x3),#3@14,1.5,4000,60000,,,edge,S-401
"""
FORCES = """mark,combination,P [kip],Mx [kip*ft],My [kip*ft]
C1,1.4D,150,30,20
C1,1.2D+1.6L,200,40,30
C2,1.2D+1.6L,250,60,40
C3,1.2D+1.6L,180,40,0
C4,1.2D+1.6L,100,20,10
"""
GROUPED = JOB + '\n[columns]\nworked = "one of a group"\n'
RAY = "axial force with bending, on the ray through the load"


@pytest.fixture(autouse=True)
def shown(monkeypatch: pytest.MonkeyPatch) -> Shown:
    return Shown(monkeypatch)


def sheet_of(folder: Path, toml: str = JOB, columns: str = COLUMNS, forces: str = FORCES) -> Sheet:
    return Sheet("C-01", "Columns", job=make_job(folder, toml=toml, columns=columns, forces=forces))


def texts(cells: Sequence[dict[str, Any]]) -> list[str]:
    return [cell["text"] for cell in cells]


def headed(shown: Shown) -> list[str]:
    """The columns whose working is printed."""
    return [item["text"].split(":")[0] for item in shown.of("heading") if item["level"] == 2]


def entries(shown: Shown) -> list[dict[str, Any]]:
    return [entry for item in shown.items for entry in item["entries"]]


def test_the_summary_stands_before_every_working(tmp_path: Path, shown: Shown) -> None:
    sheet_of(tmp_path / "job").columns()
    kinds = [item["type"] for item in shown.items]
    assert kinds[:4] == ["sheet", "table", "table", "heading"]
    assert kinds.count("table") == 2
    assert headed(shown) == ["C1", "C2", "C3", "C4"]


def test_a_line_of_the_summary(tmp_path: Path, shown: Shown) -> None:
    sheet = sheet_of(tmp_path / "job")
    sheet.columns()
    summary, _ = shown.of("table")
    assert summary["caption"] == "Columns and what governs them"
    assert [row[0]["text"] for row in summary["rows"]] == ["C1", "C2", "C3", "C4"]
    first, third = summary["rows"][0], summary["rows"][2]
    assert texts(first)[:6] == ["C1", "16 x 16 in", "8-#8 (3x3)", "#3@14", "axial and bending", "1.2D+1.6L"]
    assert texts(first)[7:] == ["OK", "below"]
    assert texts(third)[1:4] == ["20 in dia.", "8-#8", "#4 spiral@2.5"]
    found = {(one.mark, one.check): one.ratio for one in check_members(load(sheet._root)).results}
    assert [row[4]["text"] for row in summary["rows"]] == [
        *["axial and bending"] * 2,
        "second-order moment",
        "axial and bending",
    ]
    for row in summary["rows"]:
        ratio = found[row[0]["text"], row[4]["text"]]
        assert float(row[6]["text"]) == pytest.approx(ratio, abs=0.0051)


def linked(sheet: Sheet, cells: Sequence[dict[str, Any]]) -> list[Entry]:
    return [sheet.ledger[cell["link"]] for cell in cells if cell["link"]]


def test_ratios_are_linked_to_their_verdicts(tmp_path: Path, shown: Shown) -> None:
    sheet = sheet_of(tmp_path / "job")
    sheet.columns()
    summary, states = shown.of("table")
    for row, what in zip(summary["rows"], [RAY, RAY, "moment with second-order effects", RAY], strict=True):
        (verdict,) = linked(sheet, row)
        assert verdict.kind == "verdict"
        assert verdict.means.startswith(f"{row[0]['text']}: {what}")
        assert verdict.shown == row[6]["text"]
        assert verdict.verdict == row[7]["text"]
    for row in states["rows"]:
        found = linked(sheet, row)
        assert len(found) == sum(cell["text"] not in ("–", row[0]["text"]) for cell in row)
        assert all(verdict.means.startswith(f"{row[0]['text']}: ") for verdict in found)


def test_the_largest_ratio_of_each_limit_state(tmp_path: Path, shown: Shown) -> None:
    sheet = sheet_of(tmp_path / "job")
    sheet.columns()
    _, states = shown.of("table")
    head = texts(states["head"])
    assert head[:4] == ["Column", "axial and bending", "slenderness", "axial"]
    assert {"bars", "ties"} < set(head)
    by_mark = {row[0]["text"]: dict(zip(head, texts(row), strict=True)) for row in states["rows"]}
    # Only C3 is long enough that slenderness is asked about.
    assert [by_mark[mark]["slenderness"] for mark in ("C1", "C2", "C4")] == ["–"] * 3
    results = [one for one in check_members(load(sheet._root)).results if one.mark == "C3"]
    slender = max(one.ratio or 0.0 for one in results if one.check in ("stability", "second-order moment"))
    assert float(by_mark["C3"]["slenderness"]) == pytest.approx(slender, abs=0.0051)
    # Hand: 0.52 (0.85 * 4 * (256 - 6.32) + 60 * 6.32) = 638.6 kip; 200/638.6 = 0.31.
    assert by_mark["C1"]["axial"] == "0.31"


def test_a_check_that_fails_goes_before_a_larger_ratio(tmp_path: Path, shown: Shown) -> None:
    # Ties at 20 in, where 16 in is the most: NG, and named as what governs, whatever the strength is.
    sheet_of(tmp_path / "job", columns=COLUMNS.replace("#3@14", "#3@20")).columns("C1")
    (row,) = shown.of("table")[0]["rows"]
    assert texts(row)[4:8] == ["tie spacing", "–", "1.25", "NG"]


def test_detailing_met_to_the_letter_does_not_govern(tmp_path: Path, shown: Shown) -> None:
    # Ties at exactly 16 in have a ratio of 1.0; what governs is the strength.
    sheet_of(tmp_path / "job", columns=COLUMNS.replace("#3@14", "#3@16")).columns("C1")
    summary, states = shown.of("table")
    assert texts(summary["rows"][0])[4] == "axial and bending"
    assert texts(states["rows"][0])[texts(states["head"]).index("ties")] == "1.00"


# Which columns are printed


def test_one_of_a_group_is_printed(tmp_path: Path, shown: Shown) -> None:
    sheet_of(tmp_path / "job", GROUPED).columns()
    # C2 carries the most of its group; C3 stands in no group.
    assert headed(shown) == ["C2", "C3"]
    assert [texts(row)[8] for row in shown.of("table")[0]["rows"]] == ["as C2", "below", "below", "as C2"]
    folded = [item for item in shown.of("note") if "stand in the ledger" in item["parts"][0]["text"]]
    assert [item["parts"][0]["text"].split(";")[0] for item in folded] == [
        "C1 is worked as C2 is",
        "C4 is worked as C2 is",
    ]
    assert [f"its {len(item['entries'])} values" in item["parts"][0]["text"] for item in folded] == [True, True]


def test_a_column_of_a_group_that_fails_is_the_one_printed(tmp_path: Path, shown: Shown) -> None:
    lines = COLUMNS.splitlines(keepends=True)
    lines[4] = lines[4].replace("#3@14", "#3@20")
    sheet_of(tmp_path / "job", GROUPED, columns="".join(lines)).columns()
    assert headed(shown) == ["C3", "C4"]


def test_what_is_folded_stands_in_the_ledger_and_replays(tmp_path: Path, shown: Shown) -> None:
    sheet = sheet_of(tmp_path / "a", GROUPED)
    sheet.columns()
    grouped = entries(shown)
    done = replay(entry.to_json() for entry in sheet.ledger)
    assert [item for item in done if not item.agrees] == []
    assert {entry["id"] for entry in grouped} == {entry.id for entry in sheet.ledger}
    # Each solved value is confirmed, those of the folded columns as well.
    assert all(entry.confirmed_by for entry in sheet.ledger if entry.kind == "solved")
    confirms = [pair for item in shown.items for pair in item.get("confirms", ())]
    assert {identifier for identifier, _ in confirms} == {entry.id for entry in sheet.ledger if entry.kind == "solved"}
    shown.items.clear()
    sheet_of(tmp_path / "b").columns()
    assert [entry["id"] for entry in grouped if entry["kind"] == "verdict"] == [
        entry["id"] for entry in entries(shown) if entry["kind"] == "verdict"
    ]


def test_entries_shown_are_a_ledger_of_their_own(tmp_path: Path, shown: Shown) -> None:
    # What a package collects from the items: every entry once, none resting on one that is not shown.
    sheet_of(tmp_path / "job", GROUPED).columns()
    collected = Ledger.from_json(entries(shown))
    assert len(collected) == len(entries(shown)) > 300


def test_what_a_sheet_read_is_told_for_every_column(tmp_path: Path, shown: Shown) -> None:
    sheet = sheet_of(tmp_path / "job", GROUPED)
    sheet.columns()
    reads = [(key, digest) for item in shown.items for key, digest in item["reads"]]
    keys = {key for key, _ in reads}
    assert {f"columns {mark}" for mark in ("C1", "C2", "C3", "C4")} <= keys
    assert {f"forces {mark}" for mark in ("C1", "C2", "C3", "C4")} <= keys
    assert "job settings" in keys
    inputs = Inputs(load(sheet._root))
    assert all(inputs.digest(key) == digest for key, digest in reads)


def test_named_columns_alone(tmp_path: Path, shown: Shown) -> None:
    sheet_of(tmp_path / "job").columns("C3", "C1")
    assert headed(shown) == ["C3", "C1"]
    assert [texts(row)[0] for row in shown.of("table")[0]["rows"]] == ["C3", "C1"]


def test_of_named_columns_one_of_the_group_is_printed(tmp_path: Path, shown: Shown) -> None:
    # C2 is not among those named: C1 carries more than C4.
    sheet_of(tmp_path / "job", GROUPED).columns("C4", "C1")
    assert headed(shown) == ["C1"]


def test_columns_without_a_group_are_each_printed(tmp_path: Path, shown: Shown) -> None:
    sheet_of(tmp_path / "job", GROUPED, columns=COLUMNS.replace(",edge,", ",,")).columns()
    assert headed(shown) == ["C1", "C2", "C3", "C4"]


def test_a_sheet_of_columns_gives_what_one_of_each_gives(tmp_path: Path) -> None:
    together, apart = sheet_of(tmp_path / "a"), sheet_of(tmp_path / "b")
    together.columns()
    for mark in ("C1", "C2", "C3", "C4"):
        apart.column(mark)
    found = [{entry.id: sheet.ledger.hash(entry.id) for entry in sheet.ledger} for sheet in (together, apart)]
    assert found[0] == found[1]


def test_a_cell_that_runs_again_shows_the_same(tmp_path: Path, shown: Shown, monkeypatch: pytest.MonkeyPatch) -> None:
    sheet = sheet_of(tmp_path / "job")
    runs = []
    for count in (1, 2):
        monkeypatch.setattr(notebook, "cell_key", lambda count=count: ("cell", count))
        shown.items.clear()
        sheet.columns("C1", "C2")
        runs.append(list(shown.items))
    assert runs[0] == runs[1]


# What is refused


def test_no_column_at_all(tmp_path: Path) -> None:
    with pytest.raises(SheetError, match=r"no column is listed +a row in inputs/columns.csv: add the schedule"):
        Sheet("C-01", "Columns", job=make_job(tmp_path / "bare")).columns()


def test_a_mark_that_is_not_listed(tmp_path: Path, shown: Shown) -> None:
    sheet = sheet_of(tmp_path / "job")
    with pytest.raises(SheetError, match=r"mark 'C9' +a mark of inputs/columns.csv: C1, C2, C3, C4"):
        sheet.columns("C1", "C9")
    # Nothing is printed of a sheet that cannot be worked.
    assert [item["type"] for item in shown.items] == ["sheet"]


def test_a_row_that_cannot_be_is_refused(tmp_path: Path) -> None:
    sheet = sheet_of(tmp_path / "job", columns=COLUMNS.replace("4000,60000,,,edge", "40,60000,,,edge"))
    with pytest.raises(RangeError, match=r"f_c = 40 psi +allowed 2,500 psi and up"):
        sheet.columns()
