"""``calcpack bars``: the arrangements that would do, as a user reads them, and the exit status."""

from __future__ import annotations

import json
import re
from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest
from job_samples import ANCHORAGE, JOB, make_job

from calcpack import cli
from calcpack.job import load
from calcpack.members.arrangements import Arrangement, Arrangements
from calcpack.package.arranging import arrange, as_table
from calcpack.package.members import check_members

COLUMNS = """mark,shape,b [in],h [in],bars,ties,cover [in],f_c [psi],f_y [psi]
C1,rectangular,16,16,8-#9 (3x3),#3@12,1.5,4000,60000
C2,rectangular,14,14,4-#8 (2x2),#3@12,1.5,4000,60000
P-1,circular,,15,6-#8,#3 spiral@2,1.5,4000,60000
"""
FORCES = """mark,combination,P [kip],Mx [kip*ft],My [kip*ft]
C1,1: 1.4D,50,0,0
C2,1: 1.4D,400,80,20
P-1,1: 1.4D,150,20,0
"""
LOADS = """mark,load,P [kip],Mx [kip*ft],My [kip*ft]
C1,D,300,10,0
C1,L,120,15,5
C1,W,20,70,0
"""
LAST = (
    "Nothing was changed: to use an arrangement, write it under bars in inputs/columns.csv, row {}; rows of "
    "inputs/anchorage.csv that develop or splice these bars have to follow."
)
ONE = Arrangement("8-#9 (3x3)", 9, 8, 3, 3, 8.0, 8 / 256, "axial and bending", 0.8349, 0.8349, False)


def job(tmp_path: Path, **inputs: str) -> Path:
    toml = inputs.pop("toml", JOB)
    return make_job(tmp_path / "job", toml=toml, **{"columns": COLUMNS, "forces": FORCES, **inputs})


@pytest.fixture
def root(tmp_path: Path) -> Path:
    return job(tmp_path)


def run(capsys: pytest.CaptureFixture[str], *arguments: object) -> tuple[int, str, str]:
    """The command in this process: status, standard output, standard error."""
    status = cli.main(["bars", *map(str, arguments)])
    told = capsys.readouterr()
    assert "Traceback" not in told.out + told.err
    return status, told.out, told.err


def as_json(capsys: pytest.CaptureFixture[str], *arguments: object) -> tuple[int, Any]:
    status, out, err = run(capsys, *arguments, "--json")
    assert err == ""
    return status, json.loads(out)


# What is printed


def test_lighter_bars_for_a_column_that_carries_little(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    # By hand in the tests of the members: 1 % of 256 in^2, and #6 for the spacing of the ties. 8-#9 in 16 by 16 in with
    # f'c of 4 ksi carry 688 kip: 50 kip are 0.07 of it, from memory of ACI 318 22.4.2.
    status, out, err = run(capsys, root, "C1", "--limit", "4")
    assert (status, err) == (0, "")
    head, blank, column, present, _, titles, *rows = out.splitlines()
    assert (head, blank) == ("26-044  Cold store at Marl Hythe  (ACI 318-19)", "")
    assert column == "C1  16 x 16 in  #3@12"
    assert present == ("present: 8-#9 (3x3), A_st = 8.00 in^2, rho_g = 0.0312, axial and bending 0.07; no check is NG")
    assert re.split(" {2,}", titles) == ["bars", "A_st [in^2]", "rho_g", "ratio", "governing", "axial and bending"]
    assert re.split(" {2,}", rows[0]) == ["6-#6 (2x3)", "2.64", "0.0103", "0.09", "axial and bending", "0.09"]
    assert rows[3].endswith("no verdict: lateral support of bars")
    # Along a face fit 6 #5 or #6, 5 #7 or #8, 4 #9 to #11, 3 #14, 2 #18: 2*25 + 2*16 + 3*9 + 4 + 1 layouts. Below 1 %
    # are 6 of 4 to 8 #5, 4-#6 and 4-#7; the ties rule out the 4 of 10-#5; 6-#6, 4-#8 and 8-#6 are 2, 1 and 3 layouts.
    tried = "18 of 114 arrangements that fit were tried, the lightest first"
    assert rows[5] == f"{tried}; not OK: reinforcement ratio 8, tie spacing 4."
    assert rows[-1] == LAST.format(2)


def test_heavier_bars_for_a_column_that_fails(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, data = as_json(capsys, root, "C2")
    assert status == 0
    assert data["present"]["bars"] == "4-#8 (2x2)"
    assert "axial and bending" in data["present"]["not_ok"]
    assert data["present"]["ratio"] > 1
    areas = [one["A_st"]["value"] for one in data["arrangements"]]
    assert areas == sorted(areas)
    assert areas[0] > data["present"]["A_st"]["value"]
    assert all(one["ratio"] <= 1 and one["not_ok"] == [] for one in data["arrangements"])
    out = run(capsys, root, "C2")[1]
    assert re.search(r"^present: 4-#8 \(2x2\), .*; NG: axial and bending", out, re.M)
    assert out.endswith(LAST.format(3) + "\n")


def test_a_circular_column(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, _ = run(capsys, root, "P-1")
    assert status == 0
    assert "P-1  15 in dia.  #3 spiral@2\npresent: 6-#8, A_st = 4.74 in^2" in out
    assert re.search(r"^6-#6  +2\.64 ", out, re.M)
    assert re.search(r"^[6-9]-#\d+ .*", out, re.M)


def test_the_object_of_the_list(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, data = as_json(capsys, root, "C1", "--limit", "3")
    assert status == 0
    assert list(data) == [
        "job", "concrete", "mark", "present", "arrangements", "fitting", "tried", "rejected", "notes",
    ]  # fmt: skip
    assert (data["job"], data["concrete"], data["mark"]) == ("26-044", "ACI 318-19", "C1")
    first = data["arrangements"][0]
    assert first["bars"] == "6-#6 (2x3)"
    assert first["A_st"] == {"value": pytest.approx(2.64), "unit": "in^2"}
    assert first["rho_g"] == pytest.approx(2.64 / 256, rel=1e-12)
    assert first["governing"] == "axial and bending"
    assert first["ratio"] == first["axial_and_bending"] > 0
    assert (first["present"], first["not_ok"], first["no_verdict"]) == (False, [], [])
    assert len(data["arrangements"]) == 3
    assert data["tried"] == 3 + sum(data["rejected"].values())
    assert data["tried"] < data["fitting"]


def test_ten_are_listed_unless_another_number_is_given(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert len(as_json(capsys, root, "C1")[1]["arrangements"]) == 10
    assert len(as_json(capsys, root, "C1", "--limit", "1")[1]["arrangements"]) == 1


@pytest.mark.parametrize("concrete", ["ACI 318-14", "ACI 318-19"])
def test_the_present_arrangement_comes_out_as_its_checks_do(
    tmp_path: Path, capsys: pytest.CaptureFixture[str], concrete: str
) -> None:
    alone = "\n".join(COLUMNS.splitlines()[:2]).replace("12,1.5,4000", "12,1.5,5000")
    root = job(tmp_path, forces=LOADS, columns=alone, toml=JOB.replace("ACI 318-19", concrete))
    results = {one.check: one for one in check_members(load(root)).results if one.mark == "C1"}
    data = as_json(capsys, root, "C1", "--limit", "500")[1]
    assert data["present"]["axial_and_bending"] == results["axial and bending"].ratio
    assert results["axial and bending"].ratio is not None
    assert "W" in results["axial and bending"].combination
    assert data["concrete"] == concrete
    own = [one for one in data["arrangements"] if one["present"]]
    assert own == [data["present"]]


def test_an_arrangement_put_into_the_schedule_passes_every_check(
    root: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    chosen = as_json(capsys, root, "C2")[1]["arrangements"][0]
    (root / "inputs" / "columns.csv").write_text(COLUMNS.replace("4-#8 (2x2)", chosen["bars"]), "utf-8")
    results = [one for one in check_members(load(root)).results if one.mark == "C2"]
    assert [one.check for one in results if one.verdict == "NG"] == []
    there = as_json(capsys, root, "C2")[1]["present"]
    assert there == {**chosen, "present": True}


def test_bars_that_ask_for_larger_ties_are_named(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    out = run(capsys, root, "C1", "--limit", "500")[1]
    assert (
        "note: Bars of #11, #14, #18 ask for ties of 0.5 in in diameter and larger (25.7.2.2); the ties are #3" in out
    )
    assert re.search(r"^8-#9 \(3x3\) .* present$", out, re.M)


# None


def test_no_arrangement_carries_the_load(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    root = job(tmp_path, forces=FORCES.replace("C2,1: 1.4D,400", "C2,1: 1.4D,4000"))
    status, out, err = run(capsys, root, "C2")
    assert (status, err) == (1, "")
    sentence = r"No arrangement of one bar size satisfies every check of C2: \d+ fit and were tried"
    assert re.search(rf"^{sentence}; not OK: axial strength \d+, ", out, re.M)
    assert "A_st [in^2]" not in out
    assert out.endswith(LAST.format(3) + "\n")
    status, data = as_json(capsys, root, "C2")
    assert (status, data["arrangements"]) == (1, [])
    assert data["tried"] == data["fitting"] == sum(data["rejected"].values()) > 0


@pytest.mark.parametrize(("concrete", "clause"), [("ACI 318-14", "25.2.3"), ("ACI 318-19", "25.2.3")])
def test_nothing_fits(tmp_path: Path, capsys: pytest.CaptureFixture[str], concrete: str, clause: str) -> None:
    # Two #5 in 6 in are 1.0 in apart.
    columns = COLUMNS.replace("C2,rectangular,14,14,4-#8", "C2,rectangular,6,6,4-#5")
    root = job(tmp_path, columns=columns, toml=JOB.replace("ACI 318-19", concrete))
    status, out, _ = run(capsys, root, "C2")
    assert status == 1
    assert f"\nNo bars of #5 to #18 fit within the ties of C2 with the least clear spacing of {clause}.\n" in out


# Wrong input, and what is left alone


def refused(capsys: pytest.CaptureFixture[str], message: str, *arguments: object) -> None:
    status, out, err = run(capsys, *arguments)
    assert (status, out) == (2, "")
    assert re.search(message, err), err


def test_a_mark_that_is_not_in_the_schedule(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    refused(capsys, r"no such column\n +mark 'C9' +a mark of the column schedule: C1, C2, P-1$", root, "C9")
    refused(capsys, r"mark 'P1' +.*: C1, C2, P-1: did you mean 'P-1'\?", root, "P1")


def test_a_job_without_columns(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    refused(capsys, r"a mark of the column schedule: it has none", make_job(tmp_path / "bare"), "C1")


def test_what_is_wrong_in_the_tables_is_told_at_once(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (root / "inputs" / "columns.csv").write_text(COLUMNS.replace("16,16", "16,wide"), "utf-8")
    (root / "inputs" / "forces.csv").write_text(FORCES.replace("50,0,0", "none,0,0"), "utf-8")
    refused(capsys, r"(?s)the inputs cannot be read.*'wide'.*columns\.csv.*'none'.*forces\.csv", root, "C1")


def test_forces_of_a_mark_that_no_column_has(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (root / "inputs" / "forces.csv").write_text(FORCES.replace("C2,1", "C22,1"), "utf-8")
    refused(capsys, r"'C22'", root, "C1")


def test_a_row_that_a_clause_refuses(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (root / "inputs" / "columns.csv").write_text(COLUMNS.replace("12,1.5,4000", "12,1.5,400", 1), "utf-8")
    refused(capsys, r"column C1\n +f_c = 400 psi .*\ninputs/columns\.csv, row 2", root, "C1")
    assert run(capsys, root, "C2")[0] == 0


def test_another_schedule_that_is_wrong_does_not_matter(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (root / "inputs" / "anchorage.csv").write_text(ANCHORAGE.replace("#7", "#2"), "utf-8")
    assert run(capsys, root, "C1", "--limit", "1")[0] == 0


@pytest.mark.parametrize("limit", ["0", "-1"])
def test_a_list_of_none(root: Path, capsys: pytest.CaptureFixture[str], limit: str) -> None:
    refused(capsys, rf"list of arrangements\n +{limit} arrangements +1 or more", root, "C1", f"--limit={limit}")


@pytest.mark.parametrize("arguments", [[], ["--limit", "few", "C1"], ["C1", "--limit"]])
def test_a_command_that_is_not_understood(arguments: list[str], capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit, match=r"^2$"):
        cli.main(["bars", *arguments])
    assert capsys.readouterr().err.startswith("usage: calcpack bars")


def test_the_job_is_the_folder_you_stand_in(
    root: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.chdir(root)
    assert as_json(capsys, "C2") == as_json(capsys, root, "C2")


def test_nothing_is_written(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    def stamps() -> list[tuple[str, int]]:
        return sorted((str(path), path.stat().st_mtime_ns) for path in [root, *root.rglob("*")])

    before = stamps()
    run(capsys, root, "C2")
    assert stamps() == before


# The table


def test_the_table_as_texts(root: Path) -> None:
    found = arrange(load(root), "C1", 3).found
    head, rows = as_table(found)
    assert head[:3] == ["bars", "A_st [in^2]", "rho_g"]
    assert all(len(row) == len(head) for row in rows)
    assert [row[0] for row in rows] == [one.bars for one in found.found]


def test_ratios_show_on_which_side_of_one_they_are() -> None:
    # 1.0000000001 is as good as 1, 1.004 is not.
    assert table_of(1.0 + 1e-10)[0][3] == "1.00"
    assert table_of(1.004)[0][3] == "1.004"
    assert table_of(None)[0][3] == "-"


def table_of(*ratios: float | None, **changes: Any) -> list[list[str]]:
    found = tuple(replace(ONE, ratio=ratio, bending=ratio, **changes) for ratio in ratios)
    return [list(row) for row in as_table(Arrangements("C1", ONE, found, 1, 1, {}))[1]]


def test_checks_without_a_verdict_are_named_where_rows_differ() -> None:
    held, loose = ONE, replace(ONE, undecided={"lateral support of bars": "no crossties", "length l_o": ""})
    both = replace(held, undecided={"length l_o": ""}, present=True)
    rows = as_table(Arrangements("C1", ONE, (both, loose), 2, 2, {}))[1]
    assert [row[-1] for row in rows] == ["present", "no verdict: lateral support of bars"]
    assert as_table(Arrangements("C1", ONE, (), 2, 2, {}))[1] == []
