"""A new job folder."""

from __future__ import annotations

from pathlib import Path

import pytest

from calcpack.errors import RefusedError
from calcpack.job import load, read_terminations
from calcpack.job.starting import start
from calcpack.package.members import check_members


@pytest.mark.parametrize("there", [False, True])
def test_a_new_job_reads_and_checks(tmp_path: Path, there: bool) -> None:
    root = tmp_path / "new"
    if there:
        root.mkdir()
    made = start(root)
    assert {"job.toml", "inputs/anchorage.csv", "inputs/givens.toml"} <= set(made)
    assert list(made) == sorted(path.relative_to(root).as_posix() for path in root.rglob("*") if path.is_file())
    job = load(root)
    assert len(job.sheets()) == 1
    assert job.newest is not None
    assert len(read_terminations(root)) == 2
    assert not check_members(job).failed()


def test_folders_above_are_made(tmp_path: Path) -> None:
    start(tmp_path / "a" / "b")
    assert (tmp_path / "a" / "b" / "job.toml").is_file()


@pytest.mark.parametrize("name", ["job.toml", ".hidden", "sub/x"])
def test_a_folder_that_is_not_empty_is_left_alone(tmp_path: Path, name: str) -> None:
    path = tmp_path / name
    path.parent.mkdir(exist_ok=True)
    path.write_text("mine", "utf-8")
    with pytest.raises(RefusedError, match=r"is not empty; name a folder that does not exist yet, or an empty one"):
        start(tmp_path)
    assert [found for found in tmp_path.rglob("*") if found.is_file()] == [path]
    assert path.read_text("utf-8") == "mine"


def test_a_file_is_no_folder(tmp_path: Path) -> None:
    (tmp_path / "x").write_text("mine", "utf-8")
    with pytest.raises(RefusedError, match=r"x is a file"):
        start(tmp_path / "x")


def test_nothing_of_a_new_job_names_a_real_party(tmp_path: Path) -> None:
    start(tmp_path / "new")
    job = load(tmp_path / "new")
    assert (job.firm, job.client, [person.name for person in job.people]) == (
        "Your firm", "For whom", ["Originator", "Checker"],
    )  # fmt: skip
