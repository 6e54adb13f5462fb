"""``calcpack compare``: what a user reads, the object for scripts, and the exit status."""

from __future__ import annotations

import json
import re
import shutil
from pathlib import Path
from typing import Any

import pytest
from job_samples import JOB, calcpack, given, issued_demo, make_job, opening

from calcpack import cli
from calcpack.job import load
from calcpack.ledger import Entry, Ledger
from calcpack.package.build import draft


def ledger(h: float = 20.0, capacity: float = 30.0) -> Ledger:
    """A depth and a verdict on it."""
    common = {"unit": "in", "sheet": "C-01"}
    stated = {"source": "S-201, rev 1", "status": "confirmed", **common}
    return Ledger(
        [
            Entry("C-01/h", "given", "h", "depth", h, shown=f"{h:g} in", **stated),
            Entry("C-01/h_max", "given", "h_max", "depth at most", capacity, shown=f"{capacity:g} in", **stated),
            Entry(
                "C-01/verdict", "verdict", "ratio", "depth fits", h / capacity, "", f"{h / capacity:.2f}", "C-01",
                demand="C-01/h", capacity="C-01/h_max", ratio=h / capacity, verdict="OK" if h <= capacity else "NG",
            ),
        ]
    )  # fmt: skip


def write(path: Path, **values: float) -> Path:
    path.write_text(json.dumps(ledger(**values).to_json(), ensure_ascii=False), "utf-8")
    return path


def run(capsys: pytest.CaptureFixture[str], *arguments: object) -> tuple[int, str, str]:
    """The command in this process: status, standard output, standard error."""
    status = cli.main(["compare", *map(str, arguments)])
    told = capsys.readouterr()
    assert "Traceback" not in told.out + told.err
    return status, told.out, told.err


@pytest.mark.parametrize(
    ("before", "after", "expected"),
    [
        ({}, {}, 0),
        ({}, {"h": 24.0}, 0),  # a difference is no failure
        ({}, {"h": 30.0}, 0),  # a ratio of 1 holds
        ({}, {"h": 31.0}, 1),
        ({"h": 31.0}, {"h": 32.0}, 0),  # it failed before
        ({"h": 31.0}, {"h": 24.0}, 0),
    ],
)
@pytest.mark.parametrize("json_too", [[], ["--json"]])
def test_the_status_is_1_where_a_verdict_fails_that_did_not(
    tmp_path: Path,
    before: dict[str, float],
    after: dict[str, float],
    expected: int,
    json_too: list[str],
    capsys: pytest.CaptureFixture[str],
) -> None:
    old, new = write(tmp_path / "a.json", **before), write(tmp_path / "b.json", **after)
    status, out, err = run(capsys, old, new, *json_too)
    assert (status, err) == (expected, "")
    assert out


def test_what_a_person_reads(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    old, new = write(tmp_path / "a.json"), write(tmp_path / "b.json", h=24.0)
    out = run(capsys, old, new)[1]
    assert out.startswith(f"old  {old}\nnew  {new}\n\nsheets:   1 changed\n")
    assert "    C-01/h  20 in → 24 in  +20.0 %  depth\n      1 verdict rests on it: C-01/verdict\n" in out
    assert "    C-01/verdict  0.67 OK → 0.80 OK  +20.0 %  depth fits\n" in out


def test_json_is_one_object_and_nothing_else(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    old, new = write(tmp_path / "a.json"), write(tmp_path / "b.json", h=31.0)
    data = json.loads(run(capsys, old, new, "--json")[1])
    assert (data["old"]["path"], data["failing"]) == (str(old), ["C-01/verdict"])
    (change,) = data["verdicts"]["changed"]
    assert (change["from"], change["to"]) == (20.0 / 30.0, 31.0 / 30.0)  # nothing is rounded


def test_nothing_is_written(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    old, new = write(tmp_path / "a.json"), write(tmp_path / "b.json", h=31.0)
    before = [(path.name, path.stat().st_mtime_ns) for path in sorted(tmp_path.iterdir())]
    run(capsys, old, new)
    assert [(path.name, path.stat().st_mtime_ns) for path in sorted(tmp_path.iterdir())] == before


def test_bad_input_is_status_2_and_told_of_both(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    edited = tmp_path / "edited.json"
    edited.write_text(write(tmp_path / "a.json").read_text("utf-8").replace("S-201", "S-202", 1), "utf-8")
    status, out, err = run(capsys, edited, tmp_path / "missing")
    assert (status, out) == (2, "")
    assert err.startswith("InputError: two packages cannot be read\n")
    assert "C-01/h: its hash does not fit its content; the ledger was changed by hand" in err
    assert re.search(r"not there .*an issued folder.*missing\]", err)


@pytest.mark.parametrize("arguments", [[], ["a"], ["a", "b", "c"], ["a", "b", "--xml"]])
def test_two_packages_are_asked_for(arguments: list[str], capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit, match=r"^2$"):
        run(capsys, *arguments)
    assert capsys.readouterr().err.startswith("usage: calcpack")


def test_help_tells_the_exit_status_and_what_is_not_compared(capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit, match=r"^0$"):
        run(capsys, "--help")
    out = " ".join(capsys.readouterr().out.split())
    assert "0 compared, whether or not they differ; 1 a verdict is NG in NEW that was not in OLD; 2 bad input" in out
    assert "Texts and figures that no value of the ledger holds are not compared" in out


def test_a_terminal_that_cannot_show_every_sign(tmp_path: Path) -> None:
    done = calcpack(
        "compare", write(tmp_path / "a.json"), write(tmp_path / "b.json", h=24.0), PYTHONIOENCODING="ascii", LC_ALL="C"
    )
    assert done.returncode == 0
    assert "20 in → 24 in" in done.stdout


# Packages as the tool makes them


@pytest.mark.slow
def test_drafts_of_a_job_before_and_after_a_line_was_inserted(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    cells = [opening("X-1"), given("a", "2 in"), given("b", "4 in"), "sheet.verify('fits', demand=a, capacity=b)"]
    root = make_job(tmp_path / "job", {"1.ipynb": cells}, toml=JOB)
    draft(load(root))
    (root / "draft").rename(tmp_path / "before")
    make_job(tmp_path / "new", {"1.ipynb": [cells[0], given("a", "3 in"), *cells[1:]]}, toml=JOB)
    draft(load(tmp_path / "new"))
    status, out, _ = run(capsys, tmp_path / "before", tmp_path / "new" / "draft")
    assert status == 0
    assert "values:   1 added\nverdicts: none\n" in out
    assert out.endswith("X-1\n  added\n    X-1/a = 3 in  a value\n")


@pytest.fixture(scope="module")
def revised(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """A copy of the issued demo in which the soil bears more than was assumed."""
    root = tmp_path_factory.mktemp("revised") / "osier"
    shutil.copytree(issued_demo(tmp_path_factory), root)
    givens = root / "inputs" / "givens.toml"
    told = givens.read_text("utf-8")
    assert 'value = "4.0 kip/ft^2"' in told
    givens.write_text(told.replace('value = "4.0 kip/ft^2"', 'value = "4.4 kip/ft^2"'), "utf-8")
    assert calcpack("draft", root).returncode in (0, 1)
    return root


@pytest.mark.slow
def test_the_demo_with_one_given_changed(revised: Path) -> None:
    """D3: the change, what moved with it and the verdicts on it; nothing else of the package."""
    issued = revised / "record" / "issued" / "A"
    done = calcpack("compare", issued, revised / "draft", "--json")
    assert (done.returncode, done.stderr) == (0, "")
    data: dict[str, Any] = json.loads(done.stdout)
    own = [change for change in data["values"]["changed"] if change["cause"] == "own"]
    assert {change["symbol"] for change in own} == {"q_allow"}
    assert {round(change["percent"], 9) for change in own} == {10.0}  # 4.4/4.0 by hand
    assert {change["shown"]["to"] for change in own} == {"4.4 kip/ft²"}
    new = Ledger.from_json(json.loads((revised / "draft" / "ledger.json").read_text("utf-8")))
    dependants = frozenset().union(*(new.above(change["id"]) for change in own))
    below = [
        change for group in ("values", "verdicts") for change in data[group]["changed"] if change["cause"] == "below"
    ]
    assert {change["id"] for change in below} | {*data["values"]["unmoved"], *data["verdicts"]["unmoved"]} == dependants
    assert [data[group][state] for group in ("values", "verdicts", "sheets") for state in ("added", "dropped")] == [
        []
    ] * 6
    assert data["shifted"] == []


@pytest.mark.slow
def test_the_pdf_tells_the_same_as_its_folder(revised: Path) -> None:
    """The one file that leaves the office is enough."""
    issued, now = revised / "record" / "issued" / "A", revised / "draft"
    pairs = [
        (issued, now),
        (issued / "package.pdf", now / "package.pdf"),
        (issued / "ledger.json", now / "ledger.json"),
    ]
    told = [json.loads(calcpack("compare", *pair, "--json").stdout) for pair in pairs]
    assert len({(data["old"]["ledger"], data["new"]["ledger"]) for data in told}) == 1
    assert told[1]["values"] == told[0]["values"] == told[2]["values"]
    assert told[1]["verdicts"] == told[0]["verdicts"] == told[2]["verdicts"]


@pytest.mark.slow
def test_an_issue_is_the_same_as_its_own_pdf(revised: Path) -> None:
    issued = revised / "record" / "issued" / "A"
    done = calcpack("compare", issued, issued / "package.pdf")
    assert (done.returncode, done.stderr) == (0, "")
    assert "\nno difference: " in done.stdout


@pytest.mark.slow
def test_the_job_folder_itself_is_no_package(revised: Path) -> None:
    done = calcpack("compare", revised, revised / "draft")
    assert (done.returncode, done.stdout) == (2, "")
    assert f"this is a job folder; take {revised / 'record' / 'issued' / 'A'} or {revised / 'draft'}" in done.stderr
