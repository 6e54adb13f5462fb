"""From a job folder to the files of a package."""

from __future__ import annotations

import errno
import io
import json
import os
import re
import shutil
from pathlib import Path
from typing import Any

import pypdf
import pytest
from job_samples import ANCHORAGE, GIVENS, JOB, given, make_job, opening, write_notebook

from calcpack import cli
from calcpack.errors import RefusedError, SheetError, TableError
from calcpack.job import load
from calcpack.package import build
from calcpack.package.build import _mime, draft, issue, ledger_of
from calcpack.package.build import build as build_package

CELLS = [opening("X-1", "Spans"), given("a", "1 in"), given("b", "2 in"), "sheet.verify('fits', demand=a, capacity=b)"]
NAMES = {"ledger.json", "package.html", "package.pdf", "manifest.json"}


@pytest.fixture(scope="module")
def finished(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """A job that has been run, so that the tests below start no kernel."""
    root = make_job(tmp_path_factory.mktemp("build") / "job", {"1.ipynb": CELLS}, givens=GIVENS, anchorage=ANCHORAGE)
    draft(load(root))
    return root


@pytest.fixture
def root(finished: Path, tmp_path: Path) -> Path:
    copy = Path(shutil.copytree(finished, tmp_path / "job"))
    shutil.rmtree(copy / "draft")
    return copy


def pages(data: bytes) -> list[str]:
    return [page.extract_text() for page in pypdf.PdfReader(io.BytesIO(data)).pages]


def stamps(folder: Path) -> list[tuple[str, int]]:
    return sorted((str(path), path.stat().st_mtime_ns) for path in folder.rglob("*"))


@pytest.mark.slow
def test_a_draft_is_marked_on_every_page_and_lists_what_is_open(root: Path) -> None:
    built, folder = draft(load(root))
    assert folder == root / "draft"
    assert {path.name for path in folder.iterdir()} == NAMES == set(built.files)
    assert all("DRAFT, not issued" in page for page in pages(built.files["package.pdf"]))
    assert b"DRAFT, not issued" in built.files["package.html"]
    assert [item.kind for item in built.open] == ["assumed"]
    assert json.loads(built.files["manifest.json"])["state"] == "draft"
    assert list(built.seconds) == ["schedules", "notebooks", "assembly", "HTML", "PDF"]


@pytest.mark.slow
def test_an_issue_bears_the_date_of_its_revision(root: Path) -> None:
    built, folder, written = issue(load(root))
    assert (folder, written) == (root / "record" / "issued" / "A", True)
    information: Any = pypdf.PdfReader(io.BytesIO(built.files["package.pdf"])).metadata
    assert information["/CreationDate"].startswith("D:20261120000000")
    assert not any("DRAFT" in page for page in pages(built.files["package.pdf"]))
    assert issue(load(root))[2] is False


@pytest.mark.slow
def test_a_final_issue_says_so(root: Path) -> None:
    """D7."""
    (root / "job.toml").write_text(JOB.replace("Plan review", "Construction"), "utf-8")
    (root / "inputs" / "givens.toml").write_text(GIVENS.replace('"assumed"', '"confirmed"'), "utf-8")
    built, _, _ = issue(load(root))
    assert json.loads(built.files["manifest.json"])["state"] == "final"
    first = pages(built.files["package.pdf"])[0]
    assert "not for construction" not in first
    assert "Final" in first


@pytest.mark.slow
def test_a_draft_needs_no_revision(root: Path) -> None:
    (root / "job.toml").write_text(JOB[: JOB.index("[[revision]]")], "utf-8")
    built, _ = draft(load(root))
    first = " ".join(pages(built.files["package.pdf"])[0].split())
    assert "Revision none, not dated" in first
    assert "Purpose none stated" in first


@pytest.mark.slow
def test_a_failing_sheet_leaves_the_last_draft_and_the_record(root: Path) -> None:
    draft(load(root))
    issue(load(root))
    before = stamps(root / "draft") + stamps(root / "record")
    write_notebook(root, "1.ipynb", ["1 / 0"])
    for attempt in (draft, issue):
        with pytest.raises(SheetError, match="ZeroDivisionError"):
            attempt(load(root))
    assert stamps(root / "draft") + stamps(root / "record") == before
    assert sorted(path.name for path in root.iterdir()) == [
        ".calcpack", "draft", "inputs", "job.toml", "record", "sheets",
    ]  # fmt: skip


@pytest.mark.slow
@pytest.mark.parametrize("command", ["draft", "issue"])
def test_a_full_disk_is_status_2_and_nothing_half_written(
    root: Path, command: str, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def full(*_: object) -> None:
        raise OSError(errno.ENOSPC, os.strerror(errno.ENOSPC))

    monkeypatch.setattr(os, "fsync", full)
    assert cli.main([command, str(root)]) == 2
    told = capsys.readouterr()
    assert told.out == ""
    assert re.match(r"TableError: nothing was written\n  cannot write .*: No space left on device", told.err)
    assert [path for path in root.rglob("*") if path.suffix == ".pdf" or path.name.startswith(".draft")] == []


@pytest.mark.slow
def test_a_changed_purpose_is_a_difference(root: Path) -> None:
    issue(load(root))
    (root / "job.toml").write_text(JOB.replace("Plan review", "Coordination"), "utf-8")
    with pytest.raises(RefusedError, match=r"revision A is issued already.*\n.*manifest\.json differs"):
        issue(load(root))


@pytest.mark.slow
def test_the_values_of_a_job_without_typesetting(root: Path) -> None:
    content = ledger_of(load(root))
    assert [entry.id for entry in content.ledger] == ["X-1/a", "X-1/b", "X-1/verdict"]
    assert not (root / "draft").exists()


def test_bad_tables_stop_a_build_before_any_notebook_runs(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(build, "run_sheets", lambda *_: pytest.fail("a notebook ran"))
    root = make_job(tmp_path / "job", {"1.ipynb": CELLS}, anchorage=ANCHORAGE.replace("#7", "#2"))
    with pytest.raises(TableError, match="anchorage"):
        build_package(load(root), "draft")
    assert not (root / ".calcpack").exists()


@pytest.mark.parametrize(
    ("name", "mime"),
    [
        ("a.csv", "text/csv"), ("job.toml", "application/toml"), ("b.json", "application/json"),
        ("c.xlsx", "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet"),
        ("notes.unknown", "application/octet-stream"),
    ],
)  # fmt: skip
def test_embedded_files_have_a_type(name: str, mime: str) -> None:
    """F4."""
    assert _mime(Path(name)) == mime
