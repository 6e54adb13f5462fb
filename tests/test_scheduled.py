"""Rows of the schedules on a sheet: the same numbers as the bulk check, with every step in the ledger."""

from __future__ import annotations

from pathlib import Path

import pytest
from job_samples import ANCHORAGE, Shown, make_job

from calcpack import Sheet
from calcpack.errors import RangeError, SheetError, TableError
from calcpack.job import load
from calcpack.ledger import replay
from calcpack.package.members import check_members
from calcpack.package.reads import Inputs

COLUMNS = """mark,shape,b [in],h [in],bars,ties,cover [in],f_c [psi],f_y [psi],source
C1,rectangular,16,16,8-#8 (3x3),#3@14,1.5,4000,60000,S-401
C2,circular,,20,8-#8,#4 spiral@2.5,1.5,5000,60000,S-402
"""
FORCES = """mark,combination,P [kip],Mx [kip*ft],My [kip*ft]
C1,1: 1.4D,260,0,0
C1,2: 1.2D+1.6L,434,0,0
C2,1: 1.4D,148,0,0
"""


@pytest.fixture
def root(tmp_path: Path) -> Path:
    return make_job(tmp_path / "job", anchorage=ANCHORAGE, columns=COLUMNS, forces=FORCES)


@pytest.fixture(autouse=True)
def shown(monkeypatch: pytest.MonkeyPatch) -> Shown:
    return Shown(monkeypatch)


@pytest.fixture
def sheet(root: Path) -> Sheet:
    return Sheet("A-01", "Bars", job=root)


def agree(sheet: Sheet) -> int:
    done = replay(entry.to_json() for entry in sheet.ledger)
    assert [item for item in done if not item.agrees] == []
    return len(done)


@pytest.mark.parametrize("mark", ["T1", "T2"])
def test_a_termination_gives_what_the_check_gives(sheet: Sheet, root: Path, mark: str) -> None:
    required = sheet.termination(mark)
    (result,) = [one for one in check_members(load(root)).results if one.mark == mark]
    assert float(required) == result.values["l_d"][0]
    verdicts = [entry for entry in sheet.ledger if entry.kind == "verdict"]
    assert verdicts[-1].ratio == result.ratio
    assert agree(sheet) > 8


def test_its_givens_come_from_the_row(sheet: Sheet, shown: Shown, root: Path) -> None:
    sheet.termination("T1")
    sources = {item["symbol"]: item["source"] for item in shown.of("given")}
    assert "inputs/anchorage.csv" in sources["f_c"] or "S-301" in sources["f_c"]
    assert all(source.strip() for source in sources.values())
    head = shown.of("heading")[0]
    assert head["text"] == "T1: straight tension, #7 bar"
    assert head["reads"] == [["anchorage T1", Inputs(load(root)).digest("anchorage T1")]]


def test_a_column_gives_what_the_check_gives(sheet: Sheet, root: Path, shown: Shown) -> None:
    for mark in ("C1", "C2"):
        sheet.column(mark)
    strength = {entry.id: entry.value for entry in sheet.ledger if entry.symbol == "phi_P_n_max"}
    results = check_members(load(root)).results
    expected = [one.values["phi_P_n_max"][0] for one in results if one.check == "axial strength"]
    assert sorted(value / 1000 for value in strength.values()) == pytest.approx(sorted(expected))
    reads = [key for item in shown.items for key, _ in item["reads"]]
    assert reads == [
        "job codes",
        *["columns C1", "forces C1", "job settings"],
        *["columns C2", "forces C2", "job settings"],
    ]
    inputs = Inputs(load(root))
    assert all(inputs.digest(key) == digest for item in shown.items for key, digest in item["reads"])
    assert agree(sheet) > 40


def test_every_verdict_of_the_check_stands_on_the_sheet(sheet: Sheet, root: Path) -> None:
    sheet.column("C1")
    found = sorted(entry.ratio or 0.0 for entry in sheet.ledger if entry.kind == "verdict")
    owed = sorted(one.ratio for one in check_members(load(root)).results if one.mark == "C1" and one.ratio is not None)
    for ratio in owed:
        assert any(abs(ratio - one) < 1e-9 for one in found), ratio


UNFACTORED = """mark,load,P [kip],Mx [kip*ft],My [kip*ft]
C1,D,100,12,0
C1,L,60,10,4
C2,D,148,0,0
"""


def test_a_column_of_unfactored_forces_is_combined(sheet: Sheet, root: Path, shown: Shown) -> None:
    (root / "inputs" / "forces.csv").write_text(UNFACTORED, "utf-8")
    sheet.column("C1")
    # ASCE 7-16 2.3.1, hand: 1.4 * 100 = 140 kip; 1.2 * 100 + 1.6 * 60 = 216 kip.
    assert {round(entry.value / 1000, 6) for entry in sheet.ledger if entry.symbol == "P_u"} <= {140.0, 216.0, 90.0}
    (axial,) = [entry for entry in sheet.ledger if entry.means.startswith("C1: axial force within")]
    demand = sheet.ledger[axial.demand]
    assert demand.value == pytest.approx(216_000.0)
    assert demand.expression == "1.2 * P_D + 1.6 * P_L"
    results = [one for one in check_members(load(root)).results if one.mark == "C1"]
    assert axial.ratio == next(one.ratio for one in results if one.check == "axial strength")
    assert any("Combinations considered" in item["parts"][0]["text"] for item in shown.of("note"))
    agree(sheet)


def test_a_mark_that_is_not_there(sheet: Sheet) -> None:
    with pytest.raises(SheetError, match=r"mark 'T9' +a mark of inputs/anchorage.csv: T1, T2: add the row, or correct"):
        sheet.termination("T9")
    with pytest.raises(SheetError, match=r"mark 'T1' +a mark of inputs/columns.csv: C1, C2"):
        sheet.column("T1")


def test_a_job_without_schedules(tmp_path: Path) -> None:
    bare = Sheet("A-01", "Bars", job=make_job(tmp_path / "bare"))
    with pytest.raises(SheetError, match=r"a mark of inputs/anchorage.csv: none"):
        bare.termination("T1")


def test_a_row_that_no_clause_allows(root: Path, sheet: Sheet) -> None:
    (root / "inputs" / "anchorage.csv").write_text(ANCHORAGE.replace("#7,4000", "#7,40"), "utf-8")
    with pytest.raises(RangeError, match=r"f_c = 40 psi"):
        sheet.termination("T1")


def test_a_table_that_cannot_be_read(root: Path, sheet: Sheet) -> None:
    (root / "inputs" / "anchorage.csv").write_text("mark,kind\nT1,?\n", "utf-8")
    with pytest.raises(TableError, match=r"anchorage\.csv"):
        sheet.termination("T1")


def test_the_code_of_the_job(sheet: Sheet) -> None:
    assert sheet.code.name == "ACI 318-19"


def test_two_rows_on_one_sheet_do_not_mix(sheet: Sheet) -> None:
    first, second = (sheet.termination(mark) for mark in ("T1", "T2"))
    below = sheet.ledger.below(second.entry.id)
    assert first.entry.id not in below
    assert {sheet.ledger[name].value for name in below if sheet.ledger[name].symbol == "d_b"} == {1.0}  # No. 8


@pytest.mark.parametrize("mark", ["T1", "T2"])
def test_a_termination_is_drawn_to_scale_below_its_working(sheet: Sheet, shown: Shown, mark: str) -> None:
    required = sheet.termination(mark)
    (figure,) = shown.of("figure")
    assert shown.items[-1] is figure
    assert mark in figure["caption"]
    assert f"{float(required):.1f}" in figure["alt"]
    sheet.termination(mark, figure=False)
    assert len(shown.of("figure")) == 1
