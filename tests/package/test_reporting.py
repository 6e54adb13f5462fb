"""What the commands print."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any

import pytest
from job_samples import ANCHORAGE, GIVENS, make_job

from calcpack.job import load
from calcpack.ledger import Ledger
from calcpack.members.results import CheckResult
from calcpack.package.build import Built
from calcpack.package.collect import Content, SheetContent
from calcpack.package.gate import Open, open_items
from calcpack.package.members import JobChecks, check_members
from calcpack.package.reporting import build_text, check_json, check_text

RESULT = CheckResult("T9", "straight tension", "25.4.2", "", 1.2345678901234, "NG", {"l_d": (47.434164902525694, "in")})
BLANK = CheckResult("T10", "hook 90", "25.4.3", "1: 1.4D", None, "", {"l_dh": (12.0, "in"), "psi": (1.0, "")})


@pytest.fixture
def job(tmp_path: Path) -> Any:
    return load(make_job(tmp_path / "job", givens=GIVENS, anchorage=ANCHORAGE))


def test_the_object_of_the_contract(job: Any) -> None:
    checks = check_members(job)
    data = json.loads(json.dumps(check_json(job, checks, open_items(job, None, checks)), allow_nan=False))
    assert list(data) == ["job", "concrete", "results", "open", "signoffs"]
    assert (data["job"], data["concrete"], data["signoffs"]) == ("26-044", "ACI 318-19", [])
    first = data["results"][0]
    assert {"mark", "check", "clause", "combination", "ratio", "verdict", "values"} <= set(first)
    assert (first["mark"], first["check"], first["verdict"]) == ("T1", "straight tension", "OK")
    assert set(first["values"]["l_d"]) == {"value", "unit"}
    assert first["values"]["l_d"]["unit"] == "in"
    assert first["ratio"] == first["values"]["l_d"]["value"] / 72  # required over available
    assert data["open"] == [
        {
            "kind": "assumed", "where": "inputs/givens.toml",
            "what": open_items(job, None, checks)[0].what,
        }
    ]  # fmt: skip


def test_numbers_are_full_in_json_and_rounded_in_the_table(job: Any) -> None:
    checks = JobChecks((RESULT, BLANK), ())
    values = check_json(job, checks, [])["results"]
    assert values[0]["ratio"] == 1.2345678901234
    assert values[0]["values"]["l_d"]["value"] == 47.434164902525694
    assert (values[1]["ratio"], values[1]["verdict"]) == (None, "")
    rows = check_text(job, checks, []).split("\n")
    assert rows[0] == "26-044  Cold store at Marl Hythe  (ACI 318-19)"
    assert rows[2] == "T9   straight tension  1.235  NG  l_d = 47.4 in  [25.4.2]"
    assert rows[3] == "T10  hook 90           -      -   1: 1.4D  l_dh = 12 in, psi = 1  [25.4.3]"
    assert rows[-1] == "nothing open"


def test_a_job_without_schedules(job: Any) -> None:
    assert "no schedule in inputs/" in check_text(job, JobChecks((), ()), [])


def test_open_items_are_counted_and_placed(job: Any) -> None:
    text = check_text(job, JobChecks((), ()), [Open("assumed", "q = 4 ksf", "inputs/givens.toml")])
    assert text.endswith("open: 1\n  assumed: q = 4 ksf  [inputs/givens.toml]")


def test_a_build_says_what_it_made_and_what_ran() -> None:
    sheets = (
        SheetContent("L-01", "Loads", "sheets/1.ipynb", None, "its code changed"),
        SheetContent("C-01", "Columns", "sheets/2.ipynb", None, ""),
    )
    built = Built(Content(sheets, Ledger()), {"package.pdf": b"x" * 1500}, (), {"notebooks": 1.26, "PDF": 0.04})
    assert build_text(built, Path("job/draft"), "draft written").split("\n") == [
        "draft written: job/draft",
        "  package.pdf  2 kB",
        "2 sheets, 1 run, 0 values; notebooks 1.3 s, PDF 0.0 s",
        "  ran L-01: its code changed",
        "nothing open",
    ]
