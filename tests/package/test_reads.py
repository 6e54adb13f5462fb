"""Digests of what a notebook may read."""

from __future__ import annotations

from pathlib import Path

import pytest
from job_samples import ANCHORAGE, GIVENS, JOB, make_job

from calcpack.job import load
from calcpack.package.reads import Inputs, file_digest

KEYS = (
    "job codes",
    "job settings",
    "givens q_allow",
    "givens h_below",
    "anchorage T1",
    "anchorage T2",
    "columns C1",
    "forces C1",
)
COLUMNS = """mark,shape,b [in],h [in],bars,ties,cover [in],f_c [psi],f_y [psi]
C1,rectangular,16,16,8-#8 (3x3),#3@14,1.5,4000,60000
"""
FORCES = """mark,combination,P [kip],Mx [kip*ft],My [kip*ft]
C1,1: 1.4D,260,0,0
C1,2: 1.2D+1.6L,434,0,0
"""


@pytest.fixture
def root(tmp_path: Path) -> Path:
    return make_job(tmp_path / "job", givens=GIVENS, anchorage=ANCHORAGE, columns=COLUMNS, forces=FORCES)


def digests(root: Path) -> dict[str, str]:
    inputs = Inputs(load(root))
    return {key: inputs.digest(key) for key in KEYS}


@pytest.mark.parametrize(
    ("name", "old", "new", "changed"),
    [
        ("inputs/givens.toml", "4.0 kip", "4.5 kip", ["givens q_allow"]),
        ("inputs/givens.toml", "section 1, rev 0", "section 1, rev 1", ["givens h_below"]),
        ("inputs/anchorage.csv", "5.0,60", "5.5,60", ["anchorage T2"]),
        ("inputs/columns.csv", "#3@14", "#3@12", ["columns C1"]),
        ("inputs/forces.csv", "434", "435", ["forces C1"]),
        ("job.toml", "ACI 318-19", "ACI 318-14", ["job codes"]),
        ("job.toml", "[units]", "[loads]\nS_DS = 0.4\n[units]", ["job settings"]),
        ("job.toml", "[units]", '[columns]\nstiffness = "b"\n[units]', ["job settings"]),
        ("job.toml", "Marl Hythe", "Marl Hithe", []),
    ],
)
def test_a_change_shows_in_what_it_changes_alone(root: Path, name: str, old: str, new: str, changed: list[str]) -> None:
    before = digests(root)
    text = (root / name).read_text("utf-8")
    assert old in text
    (root / name).write_text(text.replace(old, new), "utf-8")
    after = digests(root)
    assert [key for key in KEYS if before[key] != after[key]] == changed


def test_a_row_that_is_gone_differs_from_one_that_is_there(root: Path) -> None:
    inputs = Inputs(load(root))
    assert inputs.digest("anchorage T9") == inputs.digest("givens none") == ""
    assert inputs.digest("anchorage T1") != ""


def test_each_table_is_read_once(root: Path) -> None:
    inputs = Inputs(load(root))
    first = inputs.digest("anchorage T1")
    (root / "inputs" / "anchorage.csv").unlink()
    assert inputs.digest("anchorage T1") == first
    assert inputs.digest("anchorage T2") != ""


def test_every_force_of_a_member_counts(root: Path) -> None:
    before = digests(root)["forces C1"]
    with (root / "inputs" / "forces.csv").open("a", encoding="utf-8") as file:
        file.write("C1,3: 0.9D,100,0,0\n")
    assert digests(root)["forces C1"] != before


def test_a_file_by_its_bytes(tmp_path: Path) -> None:
    assert file_digest(tmp_path / "none") == ""
    assert file_digest(tmp_path) == ""
    (tmp_path / "a").write_bytes(b"")
    # published: FIPS 180-4, the digest of the empty message
    assert file_digest(tmp_path / "a") == "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855"


def test_the_sample_job_is_what_the_tables_say(root: Path) -> None:
    assert load(root).codes.concrete in JOB
