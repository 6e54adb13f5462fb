"""What stands between a package and its issue."""

from __future__ import annotations

from pathlib import Path
from types import SimpleNamespace
from typing import Any

import pytest
from job_samples import ANCHORAGE, GIVENS, JOB, make_job
from nbformat import v4

from calcpack.cli import _status
from calcpack.errors import RefusedError
from calcpack.items import MIME
from calcpack.job import load
from calcpack.ledger import Entry, Ledger
from calcpack.package.build import _gated
from calcpack.package.collect import Content, SheetContent
from calcpack.package.gate import Open, is_final, open_items
from calcpack.package.members import JobChecks, check_members

NOTHING = JobChecks((), ())


@pytest.mark.parametrize(
    "purpose",
    [
        "Construction", "Issued for construction", "Permit", "Building permit", "final", "Final issue", "Record",
        "As-built", "as built record", "For Record",
    ],
)  # fmt: skip
def test_purposes_that_are_relied_on(purpose: str) -> None:
    assert is_final(purpose)


@pytest.mark.parametrize(
    "purpose",
    [
        "Plan review", "Preliminary", "Not for construction", "Review, not for permit", "prelim. permit set", "",
        "90 percent", "Reconstruction study", "Finalist review", "Coordination",
    ],
)  # fmt: skip
def test_purposes_that_are_not(purpose: str) -> None:
    """D7: an interim issue says what it is for, and is not a final one."""
    assert not is_final(purpose)


def given(symbol: str, status: str, sheet: str = "C-01") -> Entry:
    return Entry(f"{sheet}/{symbol}", "given", symbol, "a value", 1.0, "", "1", sheet, source="S-1", status=status)


def verdict(name: str, ratio: float, word: str) -> Entry:
    return Entry(
        f"C-01/{name}", "verdict", "ratio", "bars fit", ratio, "", f"{ratio:.2f}", "C-01", demand="C-01/a",
        capacity="C-01/b", ratio=ratio, verdict=word,
    )  # fmt: skip


def content(*entries: Entry, outputs: tuple[Any, ...] = ()) -> Content:
    cells = [v4.new_markdown_cell("text"), v4.new_code_cell("a", execution_count=4, outputs=list(outputs))]
    sheet = SheetContent("C-01", "Columns", "sheets/01.ipynb", v4.new_notebook(cells=cells), "")
    return Content((sheet,), Ledger([given("a", "confirmed"), given("b", "confirmed"), *entries]))


@pytest.fixture
def job(tmp_path: Path) -> Any:
    return load(make_job(tmp_path / "job", givens=GIVENS, anchorage=ANCHORAGE))


def texts(found: list[Open]) -> list[tuple[str, str, str, bool]]:
    return [(item.kind, item.what, item.where, item.blocks) for item in found]


def test_assumed_values_are_listed_once(job: Any) -> None:
    """B5: what awaits confirmation is listed, whether in the list of givens or on a sheet."""
    found = open_items(job, content(given("q_allow", "assumed"), given("j_d", "assumed")), NOTHING)
    assert [(item.kind, item.where, item.blocks) for item in found] == [
        ("assumed", "inputs/givens.toml", True), ("assumed", "sheet C-01", True),
    ]  # fmt: skip
    assert "allowable soil bearing pressure" in found[0].what
    assert "4.0 kip/ft²" in found[0].what


def test_a_ratio_over_one_is_open(job: Any) -> None:
    found = open_items(job, content(verdict("v", 1.2, "NG"), verdict("w", 0.9, "OK")), NOTHING)
    assert texts(found)[1:] == [("ratio", "bars fit: ratio 1.20 NG", "sheet C-01", True)]


def test_so_is_a_check_of_the_schedules(tmp_path: Path) -> None:
    tight = load(make_job(tmp_path / "tight", anchorage=ANCHORAGE.replace("5.125,72", "5.125,12")))
    found = open_items(tight, None, check_members(tight))
    assert texts(found) == [("ratio", "T1: straight tension NG", "inputs/anchorage.csv", True)]


def test_what_a_member_owes_is_open(job: Any) -> None:
    owed = JobChecks((), (("C1: shear", "inputs/columns.csv"),), {"C1": "inputs/columns.csv"})
    assert texts(open_items(job, None, owed))[-1] == ("not checked", "C1: shear", "inputs/columns.csv", True)


def test_an_output_that_is_not_printed_is_named_by_its_cell_and_does_not_block(job: Any) -> None:
    outputs = (
        v4.new_output("stream", text="hello"),
        v4.new_output("display_data", data={MIME: {"type": "heading", "text": "x"}, "text/plain": "x"}),
    )
    found = open_items(job, content(outputs=outputs), NOTHING)
    assert [(item.kind, item.where, item.blocks) for item in found[1:]] == [("output", "sheets/01.ipynb", False)]
    assert found[1].what.startswith("cell [4] shows stream")
    assert "not printed" in found[1].what


def solved(confirmed_by: tuple[str, ...] = ()) -> tuple[Entry, Entry]:
    """A neutral axis, and a difference that is worked from it."""
    found = Entry(
        "C-01/c", "solved", "c", "depth of the neutral axis", 8.1234, "in", "8.123400 in", "C-01", clause="22.2.1",
        method="equilibrium by Newton's method", solved_from=("C-01/a",), confirmed_by=confirmed_by,
    )  # fmt: skip
    left = Entry(
        "C-01/Delta", "worked", "Delta", "difference", 0.0, "", "0.0000", "C-01", clause="22.4", expression="c - c",
        where={"c": "C-01/c"},
    )  # fmt: skip
    return found, left


def test_a_solved_value_that_nothing_confirms_is_open(job: Any) -> None:
    found = open_items(job, content(*solved()), NOTHING)
    assert texts(found)[1:] == [
        ("output", "C-01/c = 8.123400 in, found by iteration, is not confirmed", "C-01", True)
    ]  # fmt: skip


def test_a_solved_value_that_is_confirmed_is_not(job: Any) -> None:
    assert len(open_items(job, content(*solved(("C-01/Delta",))), NOTHING)) == 1


def test_an_unconfirmed_value_blocks_a_final_issue(job: Any) -> None:
    items = open_items(job, content(*solved()), NOTHING)[1:]
    assert _status(with_purpose(job, "Construction"), items) == 1
    assert _status(with_purpose(job, "Plan review"), items) == 0
    with pytest.raises(RefusedError, match=r"output: C-01/c = 8\.123400 in, found by iteration, is not confirmed"):
        _gated(with_purpose(job, "Construction"), tuple(items))


def with_purpose(job: Any, purpose: str) -> Any:
    root = job.root
    (root / "job.toml").write_text(JOB.replace("Plan review", purpose), "utf-8")
    return load(root)


OPEN = (Open("assumed", "q = 4 ksf", "inputs/givens.toml"), Open("output", "cell [4]", "sheets/01.ipynb", False))


def test_a_final_issue_waits_for_open_items(job: Any) -> None:
    final = with_purpose(job, "Construction")
    with pytest.raises(RefusedError, match=r"revision A is for 'Construction', and 1 items? (is|are) open:") as caught:
        _gated(final, OPEN)
    assert "assumed: q = 4 ksf  [inputs/givens.toml]" in str(caught.value)
    assert "cell [4]" not in str(caught.value)
    assert "settle" in str(caught.value)
    assert _gated(final, OPEN[1:]) == "final"
    assert _gated(final, ()) == "final"


def test_a_preliminary_issue_does_not(job: Any) -> None:
    assert _gated(with_purpose(job, "Plan review"), OPEN) == "preliminary"


@pytest.mark.parametrize(
    ("purpose", "kinds", "status"),
    [
        ("Plan review", [], 0),
        ("Plan review", ["assumed"], 0),
        ("Plan review", ["ratio"], 1),
        ("Construction", [], 0),
        ("Construction", ["assumed"], 1),
        ("Construction", ["not checked"], 1),
        ("Construction", ["output"], 0),
        ("Construction", ["ratio"], 1),
    ],
)
def test_the_exit_status_says_whether_all_is_well(job: Any, purpose: str, kinds: list[str], status: int) -> None:
    items = [Open(kind, "…", "…", kind != "output") for kind in kinds]
    assert _status(with_purpose(job, purpose), items) == status


def test_a_job_without_a_revision_is_never_final() -> None:
    no_revision: Any = SimpleNamespace(newest=None)
    assert _status(no_revision, [Open("assumed", "q", "x")]) == 0
