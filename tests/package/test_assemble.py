"""The front and back matter as plain data."""

from __future__ import annotations

import hashlib
import json
from pathlib import Path
from typing import Any

import pytest
from job_samples import ANCHORAGE, GIVENS, JOB, make_job

from calcpack import validation
from calcpack.job import load
from calcpack.ledger import Entry, Ledger
from calcpack.package.assemble import DEFERENCE, _clause_order, assemble, input_digests, ledger_bytes
from calcpack.package.collect import Content, SheetContent
from calcpack.package.gate import Open

PEOPLE = """
[people.qrs]
name = "Q. R. Sand"
role = ["checker", "originator"]

[[limit]]
name = "Drift"
value = "h/400"
source = "IBC 2021"

[[deferred]]
item = "Hoist"
assumed = "22 kip"
by = "Supplier"
"""


def given(identifier: str, symbol: str, source: str, status: str = "confirmed", shown: str = "4 ksi") -> Entry:
    sheet = identifier.split("/")[0]
    return Entry(identifier, "given", symbol, "a value", 4.0, "psi", shown, sheet, source=source, status=status)


ENTRIES = (
    given("C-01/f_c", "f_c", "S-001, note 4, rev 2"),
    given("A-01/f_c", "f_c", "S-001, note 4, rev 2"),
    given("A-01/f_c.2", "f_c", "S-001, note 4, rev 2"),
    given("A-01/f_y", "f_y", "S-001, note 7, rev 2"),
    given("A-01/q", "q", "Geotechnical report GR-7 rev 1, table 3", "assumed"),
    given("A-01/A_b", "A_b", "ASTM A615, table 1"),
    Entry(
        "A-01/P_o", "worked", "P_o", "strength", 8.0, "lb", "8 lb", "A-01", clause="22.4.2.2", edition="ACI 318-19",
        expression="2 * f_c", where={"f_c": "A-01/f_c"},
    ),
    Entry(
        "A-01/l", "worked", "l", "length", 8.0, "in", "8 in", "A-01", clause="9.1", edition="ACI 318-19",
        expression="2 * f_c", where={"f_c": "A-01/f_c"},
    ),
    Entry(
        "A-01/x", "worked", "x", "sum", 8.0, "in", "8 in", "A-01", clause="statics", expression="2 * f_c",
        where={"f_c": "A-01/f_c"},
    ),
    Entry(
        "A-01/verdict", "verdict", "ratio", "fits", 2.0, "", "2.00", "A-01", clause="25.4", demand="A-01/P_o",
        capacity="A-01/f_c", ratio=2.0, verdict="NG",
    ),
)  # fmt: skip
CONTENT = Content(
    (
        SheetContent("C-01", "Columns", "sheets/1.ipynb", None, ""),
        SheetContent("A-01", "Bars", "sheets/2.ipynb", None, ""),
    ),
    Ledger(ENTRIES),
)
OPEN = (
    Open("assumed", "q = 4 ksf", "sheet A-01"),
    Open("ratio", "fits: 2.00", "sheet A-01"),
    Open("output", "cell [4]", "sheets/1.ipynb", False),
)


@pytest.fixture
def job(tmp_path: Path) -> Any:
    return load(make_job(tmp_path / "job", toml=JOB + PEOPLE, givens=GIVENS, anchorage=ANCHORAGE))


@pytest.fixture
def model(job: Any) -> dict[str, Any]:
    return assemble(job, CONTENT, OPEN, "preliminary")


def test_the_cover(model: dict[str, Any]) -> None:
    """A1: title, location, number, originator and checker; B5: the number of open assumptions."""
    assert model["job"] == {
        "number": "26-044", "title": "Cold store at Marl Hythe", "location": "Marl Hythe", "client": "Hythe Growers",
        "firm": "Quill and Ashby", "document": "",
    }  # fmt: skip
    assert (model["originators"], model["checkers"]) == (
        "N. D. Ambrey, Q. R. Sand, unsigned", "Q. R. Sand, unsigned",
    )  # fmt: skip
    assert (model["open_count"], model["assumed_count"]) == (2, 1)
    assert [item["kind"] for item in model["open"]] == ["assumed", "ratio", "output"]
    assert model["revision"] == {
        "letter": "A", "date": "2026-11-20", "purpose": "Plan review", "description": "First issue",
    }  # fmt: skip
    assert [person["roles"] for person in model["people"]] == [["originator"], ["checker", "originator"]]
    assert model["statement"] == DEFERENCE


def test_marks(job: Any) -> None:
    """D7: what is not final says so."""
    assert assemble(job, CONTENT, OPEN, "draft")["mark"] == "DRAFT, not issued"
    assert assemble(job, CONTENT, OPEN, "preliminary")["mark"] == "Plan review: not for construction"
    (job.root / "job.toml").write_text(JOB.replace("Plan review", "Construction"), "utf-8")
    assert assemble(load(job.root), CONTENT, (), "final")["mark"] == ""


def test_a_job_without_a_revision(tmp_path: Path) -> None:
    bare = load(make_job(tmp_path / "bare", toml=JOB[: JOB.index("[[revision]]")]))
    model = assemble(bare, CONTENT, (), "draft")
    assert model["revision"] == {"letter": "none", "date": "", "purpose": "none stated", "description": ""}
    assert model["log"] == []


def test_the_same_given_is_listed_once_with_every_sheet(model: dict[str, Any]) -> None:
    (concrete,) = [row for row in model["givens"] if row["symbol"] == "f_c"]
    assert (concrete["id"], concrete["sheet"]) == ("C-01/f_c", "C-01, A-01")
    assert concrete["sheets"] == ["C-01", "A-01"]
    assert [row["symbol"] for row in model["materials"]] == ["f_c", "f_y"]
    assert [row["symbol"] for row in model["assumptions"]] == ["q"]


def test_the_summary_of_ratios(model: dict[str, Any]) -> None:
    """A15: each row is what its entry states."""
    assert model["ratios"] == [
        {
            "id": "A-01/verdict", "sheet": "A-01", "what": "fits", "demand": "8 lb", "capacity": "4 ksi", "ratio": 2.0,
            "ratio_text": "2.00", "verdict": "NG", "clause": "25.4",
        }
    ]  # fmt: skip


def test_standards_and_documents(model: dict[str, Any]) -> None:
    """B3: standards with their clauses; A3: the editions are the job's."""
    clauses = {row["name"]: row["clauses"] for row in model["standards"]}
    assert clauses["ACI 318-19"] == ["9.1", "22.4.2.2"]
    assert {"ASTM A615", "ASCE 7-16", "IBC 2021"} <= set(clauses)
    assert [row["name"] for row in model["documents"]] == ["ASTM A615", "Geotechnical report GR-7 rev 1", "S-001"]
    assert model["documents"][2]["sheets"] == ["C-01", "A-01"]


def test_clauses_stand_in_the_order_of_the_code() -> None:
    clauses = ["25.4.2.4a", "25.4.10.1", "9.1", "22.4.2.2", "25.4.2.4", "table 21.2.2"]
    assert sorted(clauses, key=_clause_order)[-4:] == ["22.4.2.2", "25.4.2.4", "25.4.2.4a", "25.4.10.1"]


def test_the_basis_of_design(model: dict[str, Any]) -> None:
    assert model["basis"]["limits"] == [{"name": "Drift", "value": "h/400", "source": "IBC 2021"}]
    assert model["basis"]["deferred"] == [{"item": "Hoist", "assumed": "22 kip", "by": "Supplier"}]
    assert len(model["basis"]["conventions"]) >= 4


def test_the_validation_record_holds_every_case(model: dict[str, Any]) -> None:
    """B10: the cases this release is validated against, each with source, expected and computed value."""
    cases = model["validation"]["cases"]
    assert {case["id"] for case in cases} == {case.id for case in validation.run()}
    assert len(cases) >= 3
    for case in cases:
        assert case["holds"]
        assert case["source"].strip()
        assert case["expected"]
        assert case["deviation"].endswith("%")


def test_digests(model: dict[str, Any], job: Any) -> None:
    """F5: the digest on the cover is that of the embedded ledger."""
    assert model["digest"] == hashlib.sha256(ledger_bytes(CONTENT.ledger)).hexdigest()
    assert [item["name"] for item in model["inputs"]] == ["job.toml", "inputs/anchorage.csv", "inputs/givens.toml"]
    for item in model["inputs"]:
        assert item["sha256"] == hashlib.sha256((job.root / item["name"]).read_bytes()).hexdigest()


def test_hidden_and_lock_files_are_no_inputs(job: Any) -> None:
    for name in (".DS_Store", "~$columns.xlsx", ".columns.csv.swp"):
        (job.root / "inputs" / name).write_text("x", "utf-8")
    (job.root / "inputs" / "old").mkdir()
    assert [item["name"] for item in input_digests(job)] == ["job.toml", "inputs/anchorage.csv", "inputs/givens.toml"]


def test_the_ledger_file_is_a_plain_list_in_order() -> None:
    text = ledger_bytes(CONTENT.ledger).decode()
    assert text.endswith("]\n")
    assert [item["id"] for item in json.loads(text)] == [entry.id for entry in ENTRIES]
    assert all(len(item["hash"]) == 64 for item in json.loads(text))


def test_the_model_is_plain_data(model: dict[str, Any]) -> None:
    assert json.loads(json.dumps(model)) == model
