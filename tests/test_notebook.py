"""What surrounds a sheet in a notebook: displays, the number of the cell, short errors, files that are opened."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path
from types import SimpleNamespace
from typing import Any

import pytest

from calcpack import notebook
from calcpack.errors import CalcpackError, RefusedError


class FakeShell:
    """As much of a notebook's shell as is asked for."""

    execution_count = 7

    def __init__(self) -> None:
        self.parent_header: Any = {"metadata": {"cellId": "abc"}}
        self.handlers: list[Any] = []
        self.shown: list[Any] = []

    def set_custom_exc(self, kinds: Any, handler: Any) -> None:
        self.handlers.append((kinds, handler))

    def _showtraceback(self, *arguments: Any) -> None:
        self.shown.append(arguments)


@pytest.fixture
def shell(monkeypatch: pytest.MonkeyPatch) -> FakeShell:
    fake = FakeShell()
    monkeypatch.setattr(notebook, "shell", lambda: fake)
    return fake


def test_in_a_plain_script_there_is_no_cell_and_no_display(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(notebook, "shell", lambda: None)
    assert notebook.cell_name() == ""
    assert notebook.cell_key() == ("", 0)
    notebook.show({"type": "heading", "text": "unseen"})
    notebook.short_errors()


def test_a_plain_script_does_not_load_ipython() -> None:
    code = "import sys; from calcpack.notebook import cell_name; print(repr(cell_name()), 'IPython' in sys.modules)"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True, timeout=60)
    assert done.stdout == "'' False\n"


@pytest.mark.usefixtures("shell")
def test_the_running_cell() -> None:
    assert notebook.cell_name() == "cell [7]"
    assert notebook.cell_key() == ("abc", 7)


@pytest.mark.parametrize("header", [None, {}, {"metadata": {}}])
def test_a_front_end_that_sends_no_cell_id(shell: FakeShell, header: Any) -> None:
    shell.parent_header = header
    assert notebook.cell_key() == ("", 7)


def test_our_own_errors_are_shown_as_their_message(shell: FakeShell) -> None:
    notebook.short_errors()
    ((kinds, handler),) = shell.handlers
    assert kinds == (CalcpackError,)
    error = RefusedError("no")
    handler(shell, RefusedError, error, None)
    assert shell.shown == [(RefusedError, error, ["RefusedError: no"])]


@pytest.mark.usefixtures("shell")
def test_items_are_published_under_every_type(monkeypatch: pytest.MonkeyPatch) -> None:
    import IPython.display

    published: list[Any] = []
    monkeypatch.setattr(IPython.display, "publish_display_data", published.append)
    notebook.show({"type": "heading", "text": "Strength", "entries": [], "reads": []})
    (bundle,) = published
    assert bundle["text/markdown"] == "### Strength"
    assert bundle["text/plain"] == "Strength"


_WATCH = """
import sys
from pathlib import Path
root = Path(sys.argv[1])
sys.path.insert(0, str(root / "sheets"))
import helper
from calcpack import notebook
notebook.watch_files(root)
notebook.watch_files(root)
(root / "figures/plan.svg").read_text()
with notebook.reading_inputs():
    (root / "inputs/givens.toml").read_text()
    with notebook.reading_inputs():
        (root / "inputs/columns.csv").read_text()
    (root / "inputs/forces.csv").read_text()
open(root / "inputs/own.csv").close()
(root / "job.toml").read_text()
(root / "notes.txt").read_text()
(root / ".calcpack/layouts.json").read_text()
(root / "draft/ledger.json").read_text()
(root / "record/x.json").read_text()
(root.parent / "outside.txt").read_text()
import later
"""


def test_files_that_a_notebook_opens_are_noted(tmp_path: Path) -> None:
    root = tmp_path / "job"
    files = (
        "figures/plan.svg", "inputs/givens.toml", "inputs/columns.csv", "inputs/forces.csv", "inputs/own.csv",
        "job.toml", "notes.txt", ".calcpack/layouts.json", "draft/ledger.json", "record/x.json", "../outside.txt",
        "sheets/helper.py", "sheets/later.py",
    )  # fmt: skip
    for name in files:
        path = root / name
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_text("", "utf-8")
    notes = tmp_path / "opened"
    environment = {"CALCPACK_OPENED": str(notes), "PYTHONDONTWRITEBYTECODE": "1"}
    subprocess.run([sys.executable, "-c", _WATCH, str(root)], env=environment, check=True, timeout=60)
    noted = notes.read_text("utf-8").split()
    assert sorted(set(noted)) == [
        "figures/plan.svg", "inputs/own.csv", "job.toml", "notes.txt", "sheets/helper.py", "sheets/later.py",
    ]  # fmt: skip
    assert noted.count("figures/plan.svg") == 1  # watched once, however many sheets ask


def test_outside_a_run_nothing_is_watched(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    hooks: list[Any] = []
    monkeypatch.setattr(notebook, "sys", SimpleNamespace(addaudithook=hooks.append, modules=sys.modules))
    monkeypatch.delenv("CALCPACK_OPENED", raising=False)
    notebook.watch_files(tmp_path)
    assert hooks == []
