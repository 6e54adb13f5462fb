"""Notebooks run from clean state, only where they have to, and what is wrong is said for all of them at once."""

from __future__ import annotations

import contextlib
import json
import os
import shutil
import subprocess
import sys
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pytest
from job_samples import ANCHORAGE, GIVENS, given, make_job, opening, write_notebook

from calcpack.errors import LedgerError, SheetError
from calcpack.job import load
from calcpack.package import execute, run
from calcpack.package.execute import Outcome
from calcpack.package.run import Executed, run_sheets

LOADS = [opening("L-01"), "q = sheet.given('q_allow')", given("L_1", "5 ft")]
SPANS = [
    opening("C-01"),
    "L_1 = sheet.carry('L-01', 'L_1')",
    """from calcpack.formula import formula
from calcpack.units import Length

@formula("geometry")
def twice(*, L_1: Length) -> Length:
    \"\"\"Twice.\"\"\"
    L_2: Length = 2 * L_1
    return L_2

L_2 = sheet.work(twice)""",
]
BARS_1 = [opening("A-01"), "sheet.termination('T1')"]
BARS_2 = [
    opening("A-02"),
    "import own\nfrom pathlib import Path\nPath('../inputs/own.csv').read_text()",
    "sheet.termination('T2')",
]


def reasons(found: list[Executed]) -> dict[str, str]:
    """Sheets that ran, with the reason."""
    return {sheet.id: sheet.reason for sheet in found if sheet.reason}


def again(root: Path) -> dict[str, str]:
    return reasons(run_sheets(load(root)))


def edit(path: Path, old: str, new: str) -> None:
    text = path.read_text("utf-8")
    assert old in text
    path.write_text(text.replace(old, new), "utf-8")


@pytest.fixture(scope="module")
def finished(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """A job of four sheets that has run once; the sheet that takes a value stands before the one that gives it."""
    root = make_job(
        tmp_path_factory.mktemp("run") / "job",
        {"1_spans.ipynb": SPANS, "2_loads.ipynb": LOADS, "3_bars.ipynb": BARS_1, "4_bars.ipynb": BARS_2},
        givens=GIVENS, anchorage=ANCHORAGE, own="a,b\n1,2\n",
    )  # fmt: skip
    (root / "sheets" / "own.py").write_text("FACTOR = 2\n", "utf-8")
    assert again(root) == {
        "L-01": "first run", "C-01": "took a value from sheet L-01", "A-01": "first run", "A-02": "first run",
    }  # fmt: skip
    return root


@pytest.fixture
def root(finished: Path, tmp_path: Path) -> Path:
    """A copy of it, to change."""
    return Path(shutil.copytree(finished, tmp_path / "job"))


@pytest.fixture
def would_run(monkeypatch: pytest.MonkeyPatch) -> Callable[[Path], dict[str, str]]:
    """Which notebooks would run, and why, without running them."""

    def ask(root: Path) -> dict[str, str]:
        told: list[str] = []
        monkeypatch.setattr(run, "execute", lambda _, path: Outcome(failure=run.Problem(path.name, "not run")))
        with contextlib.suppress(SheetError):
            run_sheets(load(root), told.append)
        pairs = [text.removeprefix("running ").split(": ", 1) for text in told if text.startswith("running")]
        return {name[:1]: reason for name, reason in pairs}

    return ask


# Clean state

_LEAK = """import builtins, math, os, sys, warnings
import calcpack.units
os.environ["LEAKED"] = "1"
math.tau = 3.0
builtins.leaked = True
calcpack.units.leaked = True
sys.path.insert(0, "/leaked")
os.chdir("/")"""
_CLEAN = """import builtins, math, os, sys
import calcpack.units
assert "LEAKED" not in os.environ
assert math.tau > 6
assert not hasattr(builtins, "leaked")
assert not hasattr(builtins, "started")
assert not hasattr(calcpack.units, "leaked")
assert "/leaked" not in sys.path
assert os.path.basename(os.getcwd()) == "sheets"
assert sys.executable == os.environ["EXPECTED_PYTHON"]
assert get_ipython().user_ns.get("configured") is None"""


@pytest.mark.slow
def test_each_notebook_starts_clean_and_nothing_is_written_elsewhere(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """B9: a run does not depend on the machine, its user or another notebook."""
    root = make_job(
        tmp_path / "job",
        {"1.ipynb": [opening("X-1"), _LEAK], "2.ipynb": [opening("X-2"), _CLEAN], "3.ipynb": [_CLEAN, opening("X-3")]},
    )
    home = tmp_path / "home"
    kernel = home / ".local" / "share" / "jupyter" / "kernels" / "python3" / "kernel.json"
    startup, config = home / "startup.py", home / ".ipython" / "profile_default" / "startup" / "00.py"
    for path, text in (
        (
            kernel,
            json.dumps({"argv": ["/nonexistent", "{connection_file}"], "display_name": "x", "language": "python"}),
        ),
        (startup, "import builtins\nbuiltins.started = True\n"),
        (config, "configured = True\n"),
    ):
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_text(text, "utf-8")
    for name, value in {
        "HOME": home, "IPYTHONDIR": home / ".ipython", "JUPYTER_PATH": home / ".local" / "share" / "jupyter",
        "PYTHONSTARTUP": startup, "XDG_CONFIG_HOME": home, "XDG_CACHE_HOME": home, "EXPECTED_PYTHON": sys.executable,
    }.items():  # fmt: skip
        monkeypatch.setenv(name, str(value))
    before = sorted(home.rglob("*"))
    assert set(reasons(run_sheets(load(root)))) == {"X-1", "X-2", "X-3"}
    assert sorted(home.rglob("*")) == before
    assert sorted(path.name for path in root.iterdir()) == [".calcpack", "inputs", "job.toml", "sheets"]
    assert sorted(path.name for path in (root / "sheets").iterdir()) == ["1.ipynb", "2.ipynb", "3.ipynb"]
    assert sorted(path.name for path in (root / ".calcpack").iterdir()) == ["results", "runs"]


def test_a_kernel_gets_the_results_of_this_run_and_no_settings_of_the_user(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("PYTHONSTARTUP", "/home/x/.pythonrc")
    environment = execute._environment(Path("/job/.calcpack/results.7"), "/scratch")
    assert "PYTHONSTARTUP" not in environment
    assert environment["CALCPACK_RESULTS"] == "/job/.calcpack/results.7"
    assert environment["IPYTHONDIR"].startswith("/scratch")
    assert environment["PYTHONHASHSEED"] == "0"


# What runs again, and why


@pytest.mark.slow
def test_a_notebook_runs_only_where_it_has_to(root: Path) -> None:
    assert again(root) == {}
    edit(root / "inputs" / "givens.toml", "4.0 kip", "4.5 kip")
    assert again(root) == {"L-01": "givens q_allow changed"}  # C-01 takes a span from it, which did not change
    edit(root / "inputs" / "anchorage.csv", "5.0,60", "5.5,60")
    edit(root / "inputs" / "givens.toml", "15 in", "16 in")  # read by no sheet
    assert again(root) == {"A-02": "anchorage T2 changed"}
    write_notebook(root, "2_loads.ipynb", [opening("L-01"), "q = sheet.given('q_allow')", given("L_1", "6 ft")])
    found = run_sheets(load(root))
    assert reasons(found) == {"L-01": "its code changed", "C-01": "L-01/L_1 changed"}
    assert [sheet.path for sheet in found] == [
        "sheets/1_spans.ipynb", "sheets/2_loads.ipynb", "sheets/3_bars.ipynb", "sheets/4_bars.ipynb",
    ]  # fmt: skip
    assert '"12 ft"' in json.dumps(found[0].notebook) or '"144 in"' in json.dumps(found[0].notebook)  # 2 × 6 ft
    assert again(root) == {}


@pytest.mark.slow
def test_reasons_to_run_again(root: Path, would_run: Callable[[Path], dict[str, str]]) -> None:
    assert would_run(root) == {}
    edit(root / "inputs" / "own.csv", "1,2", "1,3")
    assert would_run(root) == {"4": "inputs/own.csv changed"}
    edit(root / "inputs" / "own.csv", "1,3", "1,2")
    edit(root / "sheets" / "own.py", "2", "3")
    assert would_run(root) == {"4": "sheets/own.py changed"}
    edit(root / "sheets" / "own.py", "3", "2")
    (root / "inputs" / "own.csv").rename(root / "inputs" / "gone.csv")
    assert would_run(root) == {"4": "inputs/own.csv changed"}
    (root / "inputs" / "gone.csv").rename(root / "inputs" / "own.csv")
    assert would_run(root) == {}
    edit(root / "job.toml", "ACI 318-19", "ACI 318-14")
    assert set(would_run(root).values()) == {"job codes changed"}


@pytest.mark.slow
def test_what_does_not_make_a_notebook_run_again(root: Path, would_run: Callable[[Path], dict[str, str]]) -> None:
    edit(root / "job.toml", "First issue", "Another description")
    path = root / "sheets" / "3_bars.ipynb"
    data = json.loads(path.read_text("utf-8"))
    data["cells"][0]["outputs"] = [{"output_type": "stream", "name": "stdout", "text": "kept by an editor"}]
    data["cells"][0]["execution_count"] = 12
    data["metadata"]["kernelspec"] = {"name": "other", "display_name": "Other"}
    path.write_text(json.dumps(data), "utf-8")
    os.utime(root / "inputs" / "anchorage.csv")
    assert would_run(root) == {}


@pytest.mark.slow
def test_another_program_runs_everything_again(
    root: Path, would_run: Callable[[Path], dict[str, str]], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(run, "release_key", lambda: "another")
    assert set(would_run(root).values()) == {"the program changed"}


@pytest.mark.slow
@pytest.mark.parametrize("text", ["", "{", "[]", "null", '{"source": 1}'])
def test_a_record_that_is_damaged_is_made_again(
    root: Path, would_run: Callable[[Path], dict[str, str]], text: str
) -> None:
    (root / ".calcpack" / "runs" / "3_bars.json").write_text(text, "utf-8")
    assert would_run(root) == {"3": "first run"}


# What is wrong


@pytest.mark.slow
def test_all_failures_of_all_notebooks_at_once(tmp_path: Path) -> None:
    root = make_job(
        tmp_path / "job",
        {
            "1_raises.ipynb": [opening("X-1"), "# a remark\n\nx = 1 / 0\ny = 2"],
            "2_refused.ipynb": [opening("X-2"), "", "sheet.given('f_c', '4 ksi', source='')"],
            "3_syntax.ipynb": ["if True print(1)"],
            "4_good.ipynb": [opening("X-4")],
            "5_dies.ipynb": [opening("X-5"), "import os\nos._exit(3)"],
            "6_none.ipynb": ["x = 1"],
            "7_two.ipynb": [opening("X-7"), "Sheet('X-8', 'Another')"],
            "8_waits.ipynb": [opening("X-9"), "sheet.carry('X-1', 'x')"],
        },
        givens=GIVENS,
    )
    (root / "sheets" / "9_torn.ipynb").write_text('{"cells": [', "utf-8")
    (root / "sheets" / "A_list.ipynb").write_text("[]", "utf-8")
    with pytest.raises(SheetError) as caught:
        run_sheets(load(root))
    message = str(caught.value)
    assert message.startswith("8 of 10 notebooks failed\n")
    assert "Traceback" not in message
    assert "\x1b" not in message
    places = [
        "sheets/1_raises.ipynb, cell [2]: x = 1 / 0", "ZeroDivisionError: division by zero",
        "sheets/2_refused.ipynb, cell [2]: sheet.given('f_c', '4 ksi', source='')", "f_c without a source",
        "sheets/3_syntax.ipynb, cell [1]: if True print(1)", "SyntaxError",
        "the kernel died", "5_dies", "no sheet", "6_none", "2 sheets: X-7, X-8", "7_two", "not a notebook: ", "9_torn",
        "A_list",
    ]  # fmt: skip
    for text in places:
        assert text in message, text
    assert len(caught.value.problems) == 8
    # What did run is kept, so that the next run is short.
    assert (root / ".calcpack" / "runs" / "4_good.json").is_file()
    assert not (root / ".calcpack" / "runs" / "1_raises.json").exists()


@pytest.mark.slow
def test_an_id_is_a_sheets_own(tmp_path: Path) -> None:
    root = make_job(tmp_path / "job", {"1.ipynb": [opening("X-1")], "2.ipynb": [opening("X-1")]})
    for _ in range(2):  # also where both are taken from the last run
        with pytest.raises(SheetError, match=r"sheet id X-1 twice  an id of its own .*: see sheets/[12]\.ipynb"):
            run_sheets(load(root))


@pytest.mark.slow
def test_sheets_that_wait_for_each_other_are_named(tmp_path: Path) -> None:
    root = make_job(
        tmp_path / "job",
        {
            "1.ipynb": [opening("X-1"), given("a", "1 in"), "sheet.carry('X-2', 'b')"],
            "2.ipynb": [opening("X-2"), given("b", "1 in"), "sheet.carry('X-1', 'a')"],
            "3.ipynb": [opening("X-3"), "sheet.carry('X-1', 'a')"],
        },
    )
    ring = r"1\.ipynb takes a value from sheet X-2; 2\.ipynb takes a value from sheet X-1$"
    message = f"circular reference between sheets: {ring}"
    with pytest.raises(LedgerError, match=message):
        run_sheets(load(root))


@pytest.mark.slow
def test_a_ring_that_closes_later_is_named_too(root: Path) -> None:
    write_notebook(root, "2_loads.ipynb", [*LOADS, "sheet.carry('C-01', 'L_2')"])
    with pytest.raises(
        LedgerError, match=r"circular reference between sheets: 1_spans.ipynb .* L-01; 2_loads.ipynb .* C-01"
    ):
        run_sheets(load(root))


@pytest.mark.slow
def test_a_sheet_that_waits_for_itself_or_for_nothing(tmp_path: Path) -> None:
    cells = [opening("X-1"), given("a", "1 in"), "sheet.carry('X-1', 'a')"]
    root = make_job(tmp_path / "job", {"1.ipynb": cells})
    with pytest.raises(LedgerError, match=r"circular reference between sheets: 1\.ipynb takes a value from sheet X-1$"):
        run_sheets(load(root))
    write_notebook(root, "1.ipynb", [opening("X-1"), "sheet.carry('Z-9', 'a')"])
    write_notebook(root, "2.ipynb", [opening("X-2"), "sheet.carry('Z-9', 'a')"])
    write_notebook(root, "3.ipynb", [opening("X-3")])
    with pytest.raises(SheetError, match="a sheet that is not there") as caught:
        run_sheets(load(root))
    assert [(problem.given, problem.allowed) for problem in caught.value.problems] == [
        (f"{name}.ipynb takes a value from sheet Z-9", "sheets that ran: X-3") for name in "12"
    ]


@pytest.mark.slow
def test_a_sheet_that_is_gone_is_missed(root: Path) -> None:
    (root / "sheets" / "2_loads.ipynb").unlink()
    with pytest.raises(SheetError, match=r"1_spans\.ipynb takes a value from sheet L-01  sheets that ran: A-01, A-02"):
        run_sheets(load(root))


@pytest.mark.slow
def test_a_value_that_is_gone_from_a_sheet(root: Path) -> None:
    write_notebook(root, "2_loads.ipynb", LOADS[:2])
    with pytest.raises(SheetError, match=r"L_1 of sheet L-01: none"):
        run_sheets(load(root))


@pytest.mark.slow
def test_a_cell_that_never_ends(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(execute, "_TIMEOUT", 2)
    root = make_job(tmp_path / "job", {"1.ipynb": ["import time\ntime.sleep(60)"]})
    with pytest.raises(SheetError, match="a cell took more than 0 minutes  a notebook that ends"):
        run_sheets(load(root))


def test_old_and_idless_notebooks_are_read_without_a_word(tmp_path: Path, recwarn: pytest.WarningsRecorder) -> None:
    root = make_job(tmp_path / "job")
    path = write_notebook(root, "1.ipynb", ["x = 1", "y = 2"])
    data: dict[str, Any] = json.loads(path.read_text("utf-8"))
    for cell in data["cells"]:
        del cell["id"]
    path.write_text(json.dumps(data), "utf-8")
    assert [cell.source for cell in execute._notebook(path).cells] == ["x = 1", "y = 2"]
    path.write_text(json.dumps({**data, "nbformat_minor": 2}), "utf-8")
    assert len(execute._notebook(path).cells) == 2
    assert list(recwarn) == []


# Two at once


@pytest.mark.slow
def test_two_runs_of_one_job_do_not_disturb_each_other(tmp_path: Path) -> None:
    root = make_job(tmp_path / "job", {"1_spans.ipynb": SPANS, "2_loads.ipynb": LOADS}, givens=GIVENS)
    command = [sys.executable, "-m", "calcpack.cli", "trace", str(root), "C-01/L_2"]
    pipes: dict[str, Any] = {"stdout": subprocess.PIPE, "stderr": subprocess.PIPE, "text": True}
    both = [subprocess.Popen(command, **pipes) for _ in range(2)]
    ended = [one.communicate(timeout=120) for one in both]
    assert [one.returncode for one in both] == [0, 0], ended
    assert ended[0] == ended[1]
    assert "= 2 * L_1" in ended[0][0]
    assert ended[0][1] == ""
    assert sorted(path.name for path in (root / ".calcpack").iterdir()) == ["layouts.json", "results", "runs"]
