"""The anchorage schedule on a sheet: a line for each termination, full working of some, the rest in the ledger."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import pytest
from job_samples import Shown, make_job

from calcpack import Sheet
from calcpack.errors import SheetError
from calcpack.job import load
from calcpack.ledger import Entry, Ledger, replay
from calcpack.package.members import check_members

ANCHORAGE = """mark,kind,bar,f_c [psi],f_y [psi],clear_cover [in],clear_spacing [in],side_cover [in],tail_cover [in],\
confining_ties,in_column_core,available [in],member,location
T1,straight tension,#8,4000,60000,2,4,,,,,60,B1,top of the wall
K1,hook 90,#8,4000,60000,,,2.75,2.0,yes,yes,15,B2,"end column, grid 1"
T2,straight tension,#5,5000,60000,2,4,,,,,,B1,
"""


@pytest.fixture
def root(tmp_path: Path) -> Path:
    return make_job(tmp_path / "job", anchorage=ANCHORAGE)


@pytest.fixture(autouse=True)
def shown(monkeypatch: pytest.MonkeyPatch) -> Shown:
    return Shown(monkeypatch)


@pytest.fixture
def sheet(root: Path) -> Sheet:
    return Sheet("A-01", "Bars", job=root)


def texts(item: dict[str, Any]) -> list[list[str]]:
    return [[cell["text"] for cell in row] for row in item["rows"]]


def carried(shown: Shown) -> Ledger:
    """The ledger as a package gathers it from the items shown."""
    return Ledger(Entry.from_json(data) for item in shown.items for data in item["entries"])


def test_a_line_for_each_and_full_working_of_the_governing_one(sheet: Sheet, shown: Shown, root: Path) -> None:
    sheet.terminations()
    (table,) = shown.of("table")
    rows = texts(table)
    assert [row[0] for row in rows] == ["T1", "K1", "T2"]
    assert [row[1:5] for row in rows] == [
        ["straight tension", "#8", "B1", "top of the wall"],
        ["hook 90", "#8", "B2", "end column, grid 1"],
        ["straight tension", "#5", "B1", "–"],
    ]
    assert [row[6:] for row in rows][2] == ["–", "–", "–"]
    results = {one.mark: one for one in check_members(load(root)).results}
    worst = max(("T1", "K1"), key=lambda mark: results[mark].ratio or 0.0)
    assert [item["text"].split(":")[0] for item in shown.of("heading")] == [worst]
    assert shown.items.index(table) < shown.items.index(shown.of("heading")[0])
    told = [item["parts"][0]["text"] for item in shown.of("note") if "values stand in the ledger" in str(item)]
    assert sorted(text.split(":")[0] for text in told) == sorted({"T1", "K1", "T2"} - {worst})


def test_ratios_are_those_of_the_check_and_link_to_their_verdicts(sheet: Sheet, shown: Shown, root: Path) -> None:
    sheet.terminations()
    (table,) = shown.of("table")
    ledger = carried(shown)
    for result, row in zip(check_members(load(root)).results, table["rows"], strict=True):
        length, ratio = row[5], row[7]
        assert ledger[length["link"]].value == pytest.approx(next(iter(result.values.values()))[0])
        assert (ledger[ratio["link"]].ratio if ratio["link"] else None) == result.ratio


def test_every_value_is_in_the_ledger_and_replays(sheet: Sheet, shown: Shown) -> None:
    sheet.terminations()
    gathered = carried(shown)
    assert {entry.id for entry in gathered} == {entry.id for entry in sheet.ledger}
    done = replay(gathered.to_json())
    assert len(done) > 20
    assert [one for one in done if not one.agrees] == []


def test_marks_and_those_worked_in_full_may_be_named(sheet: Sheet, shown: Shown) -> None:
    sheet.terminations("T2", "T1", worked=("T2",))
    assert [row[0] for row in texts(shown.of("table")[0])] == ["T2", "T1"]
    assert [item["text"].split(":")[0] for item in shown.of("heading")] == ["T2", "T1"]


def test_marks_that_are_not_there(sheet: Sheet) -> None:
    with pytest.raises(SheetError, match=r"mark 'T9' +a mark of inputs/anchorage.csv: T1, K1, T2"):
        sheet.terminations("T9")
    with pytest.raises(SheetError, match=r"worked: 'K1' +one of T1, T2"):
        sheet.terminations("T1", "T2", worked=("K1",))


def test_no_schedule(tmp_path: Path) -> None:
    with pytest.raises(SheetError, match=r"no termination is listed +a row in inputs/anchorage.csv"):
        Sheet("A-01", "Bars", job=make_job(tmp_path / "job")).terminations()


def test_options_side_by_side(sheet: Sheet, shown: Shown) -> None:
    sheet.options("K1", worked=("hook 90",))
    (table,) = shown.of("table")
    rows = texts(table)
    assert [cell["text"] for cell in table["head"]] == ["Option", "Required", "Over available", "Fits", "At best"]
    assert [row[0] for row in rows] == ["straight tension", "hook 90", "hook 180", "headed"]
    assert {row[3] for row in rows} <= {"fits", "does not fit", "not permitted"}
    assert rows[0][3] == "does not fit"
    said = [item["parts"][0]["text"] for item in shown.of("note")]
    assert any(text.startswith("Hook 90; applied:") for text in said)
    headings = [item["text"] for item in shown.of("heading")]
    assert headings[0] == "K1: ways to anchor the #8 bar"
    assert any("hook 90" in text for text in headings[1:])
    assert not any("headed" in text for text in headings[1:])
    assert [one for one in replay(carried(shown).to_json()) if not one.agrees] == []
    assert [item for item in shown.items if item["type"] == "verdict"] == []


def test_options_that_are_not_there(sheet: Sheet) -> None:
    with pytest.raises(SheetError, match=r"worked: 'lap tension' +one of straight tension, hook 90, hook 180, headed"):
        sheet.options("K1", worked=("lap tension",))
    with pytest.raises(SheetError, match="mark 'X1'"):
        sheet.options("X1")
