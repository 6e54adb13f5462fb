"""Run one notebook in a kernel of its own, from clean state, leaving no trace outside a scratch folder."""

from __future__ import annotations

import asyncio
import json
import os
import re
import tempfile
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from calcpack.errors import Problem

__all__ = ["Outcome", "execute"]

_TIMEOUT = 600  # seconds a cell may take


@dataclass(frozen=True)
class Outcome:
    """What came of a run.

    Attributes
    ----------
    notebook : executed, as plain data; as far as it came where `needs` names a sheet
    opened : files of the job that it opened by itself
    failure : what went wrong
    needs : the sheet it has to wait for
    """

    notebook: Any = None
    opened: tuple[str, ...] = ()
    failure: Problem | None = None
    needs: str = ""


def execute(results: Path, path: Path) -> Outcome:
    """Run the notebook at `path`; what the sheets before it left is in `results`."""
    import nbformat
    from nbclient.exceptions import CellExecutionError, CellTimeoutError, DeadKernelError

    name = f"sheets/{path.name}"
    try:
        notebook = _notebook(path)
    except (ValueError, LookupError, TypeError, AttributeError, OSError, nbformat.ValidationError) as error:
        found = f"not a notebook: {str(error).splitlines()[0]}"
        return Outcome(failure=Problem(found, "a file that Jupyter opens", "save it again from Jupyter", name))
    for cell in notebook.cells:
        if cell.cell_type == "code":
            cell.outputs, cell.execution_count = [], None
    with tempfile.TemporaryDirectory(prefix="cp") as scratch:
        opened = Path(scratch) / "opened"
        environment = {**_environment(results, scratch), "CALCPACK_OPENED": str(opened)}
        try:
            # A loop of its own, closed whatever comes: a kernel that dies leaves tasks waiting for it.
            asyncio.run(_client(notebook, path, Path(scratch)).async_execute(env=environment))
        except CellExecutionError as error:
            return _failed(notebook, path, error)
        except DeadKernelError:
            return Outcome(failure=Problem("the kernel died", "a notebook that runs", "run it by hand", name))
        except CellTimeoutError:
            found = f"a cell took more than {_TIMEOUT // 60} minutes"
            return Outcome(failure=Problem(found, "a notebook that ends", "run it by hand", name))
        files = tuple(sorted(set(opened.read_text("utf-8").split("\n")) - {""})) if opened.exists() else ()
    return Outcome(json.loads(nbformat.writes(notebook, split_lines=False)), files)


def _environment(results: Path, scratch: str) -> dict[str, str]:
    # The user's own IPython and matplotlib settings must not reach a calculation, nor be written to.
    return {
        **{name: value for name, value in os.environ.items() if name != "PYTHONSTARTUP"},
        "CALCPACK_RESULTS": str(results),
        "IPYTHONDIR": f"{scratch}/ipython",
        "MPLCONFIGDIR": str(results.with_name("matplotlib")),
        "PYTHONHASHSEED": "0",
        "PYTHONDONTWRITEBYTECODE": "1",
    }


def _client(notebook: Any, path: Path, scratch: Path) -> Any:
    from jupyter_client.kernelspec import KernelSpecManager
    from jupyter_client.manager import AsyncKernelManager
    from nbclient import NotebookClient

    class Manager(AsyncKernelManager):
        """Kernels that talk through files in the scratch folder: no port, no trace elsewhere."""

        def __init__(self, **options: Any) -> None:
            # Without folders to look in, the kernel is this Python's own, whatever the machine calls python3.
            own = KernelSpecManager(kernel_dirs=[])
            super().__init__(
                transport="ipc", connection_file=str(scratch / "k.json"), kernel_spec_manager=own, **options
            )

    return NotebookClient(
        notebook,
        timeout=_TIMEOUT,
        kernel_name="python3",
        kernel_manager_class=Manager,
        resources={"metadata": {"path": str(path.parent)}},
        shutdown_kernel="immediate",
        store_widget_state=False,
        record_timing=False,
        extra_arguments=["--HistoryManager.enabled=False", "--log-level=ERROR"],
    )


def _failed(notebook: Any, path: Path, error: Any) -> Outcome:
    if error.ename == "NeedsSheet":
        return Outcome(notebook, needs=str(error.evalue).split("needs sheet ", 1)[1].split("\n", 1)[0].strip())
    cell = next(
        (cell for cell in notebook.cells if any(output.output_type == "error" for output in cell.get("outputs", ()))),
        None,
    )
    place = f"sheets/{path.name}, cell [{cell.execution_count}]" if cell else f"sheets/{path.name}"
    trace = re.sub(r"\x1b\[[0-9;]*m", "", str(error.traceback))
    told = re.search(r"in line \d+: (.*)", trace)
    source = _line(cell.source if cell else "", re.search(r"Cell In\[\d+\], line (\d+)", trace))
    message = f"{error.ename}: {error.evalue}".replace("\n", "\n      ")
    return Outcome(failure=Problem(f"{place}: {told[1] if told else source}", f"\n      {message}"))


def _line(source: str, at: re.Match[str] | None) -> str:
    """The line of a cell at which it failed; the first that says something where that is not told."""
    lines = source.splitlines()
    if at and int(at[1]) <= len(lines):
        return lines[int(at[1]) - 1].strip()
    return next((line for line in lines if line.strip()), "")


def _notebook(path: Path) -> Any:
    import nbformat

    data = json.loads(path.read_text("utf-8"))
    for index, cell in enumerate(data["cells"]) if data["nbformat"] == 4 and data["nbformat_minor"] >= 5 else ():
        cell.setdefault("id", f"cell-{index}")
    notebook = nbformat.reads(json.dumps(data), as_version=4)
    nbformat.validate(notebook)
    return notebook
