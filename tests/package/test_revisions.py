"""The revision log lists the sheets each revision touched, computed from content (package requirement D3)."""

from __future__ import annotations

import json
from pathlib import Path

import pytest
from job_samples import JOB, make_job

from calcpack.job import Job, load
from calcpack.ledger import Entry, Ledger
from calcpack.package.collect import Content, SheetContent
from calcpack.package.revisions import touched

LOG = "".join(
    f'[[revision]]\nletter = "{letter}"\ndate = 2026-11-{day}\npurpose = "Plan review"\ndescription = "Issue"\n\n'
    for letter, day in (("A", 10), ("B", 20), ("C", 28))
)


def content(**widths: float) -> Content:
    entries = [
        Entry(
            f"{sheet}/b", "given", "b", "width", width, "in", f"{width:g} in", sheet, source="S-201", status="confirmed"
        )
        for sheet, width in widths.items()
    ]
    return Content(tuple(SheetContent(sheet, "Columns", "", None, "") for sheet in widths), Ledger(entries))


def issued(job: Job, letter: str, state: Content) -> None:
    folder = job.root / "record" / "issued" / letter
    folder.mkdir(parents=True)
    sheets = [{"id": sheet.id, "content": state.sheet_hash(sheet.id)} for sheet in state.sheets]
    (folder / "manifest.json").write_text(json.dumps({"sheets": sheets}), "utf-8")


@pytest.fixture
def job(tmp_path: Path) -> Job:
    return load(make_job(tmp_path / "job", toml=JOB[: JOB.index("[[revision]]")] + LOG))


def test_each_revision_lists_exactly_what_differs_from_the_one_before(job: Job) -> None:
    issued(job, "A", content(C1=16.0, C2=14.0))
    issued(job, "B", content(C1=18.0, C2=14.0))
    # C drops C2 and adds C3; C1 stays as it was in B.
    assert touched(job, content(C1=18.0, C3=20.0)) == [([], "all"), (["C1"], ""), (["C2", "C3"], "")]


def test_a_revision_that_changes_nothing_says_so(job: Job) -> None:
    for letter in "AB":
        issued(job, letter, content(C1=16.0))
    assert touched(job, content(C1=16.0)) == [([], "all"), ([], "none"), ([], "none")]


def test_what_the_record_does_not_hold_is_not_claimed(job: Job) -> None:
    issued(job, "A", content(C1=16.0))
    unknown = ([], "not known: revision B is not in the record")
    assert touched(job, content(C1=18.0)) == [([], "all"), unknown, unknown]


def test_the_newest_is_what_the_job_holds_now_even_once_it_is_issued(job: Job) -> None:
    for letter in "ABC":
        issued(job, letter, content(C1=16.0))
    assert touched(job, content(C1=18.0))[-1] == (["C1"], "")
