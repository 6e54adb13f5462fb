"""Every check of the schedules, and everything that is wrong in them at once."""

from __future__ import annotations

from pathlib import Path

import pytest
from job_samples import ANCHORAGE, JOB, make_job

from calcpack.errors import InputError, RangeError, TableError
from calcpack.job import load
from calcpack.package.members import check_members

COLUMNS = """mark,shape,b [in],h [in],bars,ties,cover [in],f_c [psi],f_y [psi]
C1,rectangular,16,16,8-#8 (3x3),#3@14,1.5,4000,60000
C2,rectangular,14,14,4-#9 (2x2),#4@12,1.5,4000,60000
"""
FORCES = """mark,combination,P [kip],Mx [kip*ft],My [kip*ft]
C1,1: 1.4D,260,0,0
C2,1: 1.4D,78,40,0
"""


def job(tmp_path: Path, **inputs: str) -> Path:
    return make_job(tmp_path / "job", **{"columns": COLUMNS, "forces": FORCES, "anchorage": ANCHORAGE, **inputs})


def test_members_in_the_order_of_their_tables(tmp_path: Path) -> None:
    checks = check_members(load(job(tmp_path)))
    assert list(dict.fromkeys(result.mark for result in checks.results)) == ["C1", "C2", "T1", "T2"]
    assert [checks.where(result) for result in checks.results[-3:]] == [
        "inputs/columns.csv", "inputs/anchorage.csv", "inputs/anchorage.csv",
    ]  # fmt: skip
    assert checks.failed() == []


def test_what_a_member_owes_names_it(tmp_path: Path) -> None:
    twisted = """mark,combination,P [kip],Mx [kip*ft],My [kip*ft],T [kip*ft]
C1,1: 1.4D,260,0,0,0
C2,1: 1.4D,78,40,0,3
"""
    assert check_members(load(job(tmp_path, forces=twisted))).owed == (("C2: torsion", "inputs/columns.csv"),)


def test_bending_is_no_open_item(tmp_path: Path) -> None:
    checks = check_members(load(job(tmp_path)))
    assert checks.owed == ()
    ratios = {one.mark: one.ratio for one in checks.results if one.check == "axial and bending"}
    axial = {one.mark: one.ratio for one in checks.results if one.check == "axial strength"}
    assert ratios["C1"] == pytest.approx(axial["C1"])
    assert (ratios["C2"] or 0.0) > (axial["C2"] or 0.0)


def test_unfactored_forces_are_combined_before_they_are_checked(tmp_path: Path) -> None:
    by_load = """mark,load,P [kip],Mx [kip*ft],My [kip*ft]
C1,D,100,0,0
C1,L,60,0,0
C2,D,50,20,0
C2,W,-60,30,0
"""
    checks = check_members(load(job(tmp_path, forces=by_load)))
    found = {(one.mark, one.check): one for one in checks.results}
    # ASCE 7-16 2.3.1, hand: 1.2 * 100 + 1.6 * 60 = 216 kip; 1.2 * 50 - 60 = 0 with 1.2 * 20 + 30 = 54 kip*ft.
    assert found["C1", "axial strength"].values["P_u"] == (pytest.approx(216.0), "kip")
    bending = found["C2", "axial and bending"]
    assert bending.values["P_u"] == (pytest.approx(0.0, abs=1e-9), "kip")
    assert bending.values["M_ux"] == (pytest.approx(54.0), "kip*ft")
    assert checks.owed == ()


def test_what_cannot_be_combined_is_told_with_its_column(tmp_path: Path) -> None:
    by_load = "mark,load,P [kip],Mx [kip*ft],My [kip*ft]\nC1,L,60,0,0\nC2,D,50,20,0\n"
    with pytest.raises(TableError, match=r"column C1: unfactored forces\n +rows of L without D"):
        check_members(load(job(tmp_path, forces=by_load)))


SLENDER = COLUMNS.replace("f_y [psi]", "f_y [psi],l_u [ft],frame,story,k_x,k_y").replace(
    "60000", "60000,14,sway,2,1.4,1.4"
)
STORIES = """story,sum_P_u [kip],V_us [kip],Delta_o [in],l_c [ft],sum_P_c [kip]
2,900,40,0.4,14,9000
"""


def test_a_sway_column_takes_its_story(tmp_path: Path) -> None:
    checks = check_members(load(job(tmp_path, columns=SLENDER, stories=STORIES)))
    assert [one.check for one in checks.results if one.mark == "C2"][:3] == [
        "axial and bending", "stability", "second-order moment",
    ]  # fmt: skip


def test_a_story_that_is_not_listed(tmp_path: Path) -> None:
    with pytest.raises(InputError, match=r"stor"):
        check_members(load(job(tmp_path, columns=SLENDER, stories=STORIES.replace("2,900", "3,900"))))


def test_the_stiffness_of_slender_columns_is_a_setting_of_the_job(tmp_path: Path) -> None:
    columns = SLENDER.replace("sway,2,1.4,1.4", "nonsway,,,")

    def stability(name: str, toml: str) -> list[float | None]:
        root = make_job(tmp_path / name, columns=columns, forces=FORCES, toml=JOB + toml)
        return [one.ratio for one in check_members(load(root)).results if one.check == "stability"]

    usual, by_gross, by_bars = (
        stability("usual", ""),
        stability("gross", '[columns]\nstiffness = "a"\n'),
        stability("bars", '[columns]\nstiffness = "b"\n'),
    )
    assert len(usual) == 2
    assert usual == by_gross
    assert all(one != other for one, other in zip(by_gross, by_bars, strict=True))


def test_failed_checks(tmp_path: Path) -> None:
    checks = check_members(load(job(tmp_path, forces=FORCES.replace("260", "2600"))))
    assert [(result.mark, result.check) for result in checks.failed()] == [
        ("C1", "axial and bending"), ("C1", "axial strength"),
    ]  # fmt: skip


def test_a_job_without_tables(tmp_path: Path) -> None:
    checks = check_members(load(make_job(tmp_path / "bare")))
    assert (checks.results, checks.owed) == ((), ())


def test_everything_wrong_in_all_tables_at_once(tmp_path: Path) -> None:
    root = job(
        tmp_path,
        columns=COLUMNS.replace("16,16", "16,wide"),
        forces=FORCES.replace("260", "none"),
        anchorage=ANCHORAGE.replace("#7", "#2"),
    )
    with pytest.raises(TableError, match=r"^the inputs cannot be read\n") as caught:
        check_members(load(root))
    places = " ".join(problem.where for problem in caught.value.problems)
    for name in ("columns.csv", "forces.csv", "anchorage.csv"):
        assert name in places


def test_a_cell_that_cannot_be_read_does_not_hide_what_a_clause_refuses_in_another_row(tmp_path: Path) -> None:
    root = job(tmp_path, anchorage=ANCHORAGE.replace("#7,4000", "#7,none").replace("#8,4000", "#8,41"))
    with pytest.raises(TableError) as caught:
        check_members(load(root))
    message = str(caught.value)
    assert "none" in message
    assert "f_c = 41 psi" in message


def test_one_table_keeps_its_own_message(tmp_path: Path) -> None:
    with pytest.raises(TableError, match=r"anchorage\.csv") as caught:
        check_members(load(job(tmp_path, anchorage=ANCHORAGE.replace("#7", "#2"))))
    assert "the inputs cannot be read" not in str(caught.value)


def test_rows_that_no_clause_allows_are_gathered(tmp_path: Path) -> None:
    root = job(tmp_path, anchorage=ANCHORAGE.replace("#7,4000", "#7,40").replace("#8,4000", "#8,41"))
    with pytest.raises(RangeError, match="the schedules cannot be checked") as caught:
        check_members(load(root))
    assert {"f_c = 40 psi", "f_c = 41 psi"} <= {problem.given for problem in caught.value.problems}
    assert all("inputs/anchorage.csv, row" in problem.where for problem in caught.value.problems)


def test_a_force_without_its_column(tmp_path: Path) -> None:
    with pytest.raises(InputError, match="C9"):
        check_members(load(job(tmp_path, forces=FORCES + "C9,1: 1.4D,10,0,0\n")))


def test_the_list_of_givens_is_read_with_the_tables(tmp_path: Path) -> None:
    root = job(tmp_path, givens='[[given]]\nsymbol = "q"\n', anchorage=ANCHORAGE.replace("#7", "#2"))
    with pytest.raises(TableError, match="the inputs cannot be read") as caught:
        check_members(load(root))
    places = " ".join(problem.where for problem in caught.value.problems)
    assert "givens.toml" in places
    assert "anchorage.csv" in places


@pytest.mark.parametrize(
    ("legs", "verdict", "said"),
    [
        ("", "", ["C9: lateral support of bars: Bars between the corners along x and along y need crossties"]),
        ("2", "NG", []),
        ("4", "OK", []),
    ],
)
def test_crossties_that_the_schedule_is_silent_of_are_an_open_item(
    tmp_path: Path, legs: str, verdict: str, said: list[str]
) -> None:
    columns = (
        "mark,shape,b [in],h [in],bars,ties,cover [in],f_c [psi],f_y [psi],legs_x,legs_y\n"
        f"C9,rectangular,30,30,12-#8 (4x4),#3@14,1.5,4000,60000,{legs},{legs}\n"
    )
    checks = check_members(load(make_job(tmp_path / "legs", columns=columns)))
    (support,) = [one for one in checks.results if one.check == "lateral support of bars"]
    assert support.verdict == verdict
    assert [text.split(";")[0] for text, _ in checks.owed] == said
    assert all(text.endswith("State legs_x and legs_y.") for text, _ in checks.owed)
