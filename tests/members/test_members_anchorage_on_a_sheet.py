"""Bundles, splices, joints, supports, options and dowels on a real sheet: its ledger replays, as the bulk decides."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import pytest
from job_samples import JOB

from calcpack import notebook
from calcpack.job import read_terminations
from calcpack.ledger import replay
from calcpack.members import anchorage
from calcpack.members.anchorage_options import HEAD, option_cells, work_options
from calcpack.members.dowels import Dowels, work_dowels
from calcpack.scheduled import SheetPad
from calcpack.sheet import Sheet

# handcalcs calls names of pyparsing that are due to go.
pytestmark = pytest.mark.filterwarnings("ignore::DeprecationWarning")

ANCHORAGE = """mark,kind,bar,f_c [psi],f_y [psi],c_b [in],clear_cover [in],clear_spacing [in],bundle,spliced,other_bar,\
bar_stress,spiral,M_n [kip*ft],V_u [kip],l_a [in],confined_reaction,joint,in_column_core,A_s_required [in^2],\
A_s_provided [in^2],coating,available [in]
B1,straight tension,#8,4000,60000,2.5,2,4,3,,,,,,,,,,,3,4,epoxy,90
B2,lap tension,#8,4000,60000,,2,4,4,50%,,,,,,,,,,1,2,,90
B3,lap compression,#8,4000,60000,,,,3,,,,yes,,,,,,,,,,40
S1,lap tension,#8,4000,60000,,2,4,,50%,,,,,,,,,,1,2.2,,60
S2,lap tension,#8,4000,60000,,2,4,,50%,,40%,,,,,,,,,,,60
S3,lap tension,#8,4000,60000,,2,4,,,#9,,,,,,,,,,,,80
S4,lap compression,#14,4000,60000,,,,,,#9,,,,,,,,,,,,40
S5,mechanical splice,#10,4000,60000,,,,,,,,,,,,,,,,,,
J1,hook 90,#9,5000,60000,,,,,,,,,,,,,special,yes,,,epoxy,20
J2,straight tension,#9,5000,60000,,,,,,,,,,,,,special,yes,,,,40
P1,straight tension,#8,4000,60000,,2,4,,,,,,200,80,6,yes,,,,,,60
P2,straight tension,#8,4000,60000,,2,4,,,,,,200,80,,,,,,,,60
"""
MARKS = [line.split(",")[0] for line in ANCHORAGE.splitlines()[1:]]


@pytest.fixture(params=["ACI 318-14", "ACI 318-19"])
def sheet(request: pytest.FixtureRequest, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Sheet:
    (tmp_path / "inputs").mkdir()
    (tmp_path / "job.toml").write_text(JOB.replace("ACI 318-19", request.param), "utf-8")
    (tmp_path / "inputs" / "anchorage.csv").write_text(ANCHORAGE, "utf-8")
    shown: list[Any] = []
    monkeypatch.setattr(notebook, "show", shown.append)
    return Sheet("C-01", "Anchorage", tmp_path)


def row_of(sheet: Sheet, mark: str) -> Any:
    return next(one for one in read_terminations(sheet._root) if one.mark == mark)


def disagreeing(sheet: Sheet) -> list[Any]:
    return [item for item in replay(entry.to_json() for entry in sheet.ledger) if not item.agrees]


@pytest.mark.parametrize("mark", MARKS)
def test_a_row_on_a_sheet_comes_to_what_the_bulk_says(mark: str, sheet: Sheet) -> None:
    value = sheet.termination(mark)
    result = anchorage.check(row_of(sheet, mark), sheet.code)
    words = [entry.verdict for entry in sheet.ledger if entry.kind == "verdict"]
    assert ("NG" in words) is (result.verdict == "NG")
    (symbol,) = result.values
    assert value.entry.symbol == symbol
    scale = 1000.0 if symbol == "P_splice" else 1.0
    assert float(value) == pytest.approx((result.values[symbol][0] or 0.0) * scale)
    assert disagreeing(sheet) == []


def test_a_support_decides_the_verdict(sheet: Sheet) -> None:
    # By hand: l_d = 47.43 in; 1.3*30 + 6 = 45 in confined, 30 in not: neither is enough, whatever is available.
    for mark, largest in (("P1", 45.0), ("P2", 30.0)):
        sheet.termination(mark)
        assert float(sheet.values("l_d_max")[-1]) == pytest.approx(largest)
        assert anchorage.check(row_of(sheet, mark), sheet.code).verdict == "NG"


def test_options_stand_in_the_ledger_and_in_a_table(sheet: Sheet) -> None:
    worked = work_options(SheetPad(sheet), row_of(sheet, "P1"), sheet.code)
    sheet.table(HEAD, [option_cells(one) for one in worked], "Options")
    assert [entry for entry in sheet.ledger if entry.kind == "verdict"] == []
    assert disagreeing(sheet) == []
    ratios = [float(value) for value in sheet.values("r_length")]
    assert ratios == [pytest.approx((one.option.length or 0.0) / 60.0) for one in worked]


def test_dowels_stand_in_the_ledger(sheet: Sheet) -> None:
    dowels = Dowels(
        mark="C1", A_g=196.0, n_bars=4, bar=8, column_bar=11, f_c_foundation=4_000.0, f_c_column=4_000.0, f_y=60_000.0,
        into_foundation=20.0, into_column=30.0, source="S-301, detail 2, rev 1",
    )  # fmt: skip
    assert [one.verdict for one in work_dowels(SheetPad(sheet), dowels, sheet.code)] == ["OK"] * 3
    assert disagreeing(sheet) == []
