"""Every check of the schedules, and everything that is wrong in them at once."""

from __future__ import annotations

from pathlib import Path

import pytest
from job_samples import ANCHORAGE, make_job

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
    owed = check_members(load(job(tmp_path))).owed
    assert any(text.startswith("C2: ") for text, _ in owed)  # its bending is not covered
    assert not any(text.startswith("C1: ") and "bending" in text for text, _ in owed)


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
