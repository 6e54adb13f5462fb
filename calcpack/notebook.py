"""The notebook around a sheet: showing items, naming the cell, and short errors in place of tracebacks."""

from __future__ import annotations

import linecache
import os
import re
import sys
from collections.abc import Mapping
from pathlib import Path
from types import TracebackType
from typing import Any

from calcpack.errors import CalcpackError
from calcpack.items import bundle

__all__ = ["cell_key", "cell_name", "short_errors", "show", "watch_files"]


def shell() -> Any:
    """The running IPython shell, or ``None`` in a plain script; IPython is not imported for the question."""
    interactive = sys.modules.get("IPython")
    return interactive.get_ipython() if interactive is not None else None


def show(item: Mapping[str, Any]) -> None:
    """Display an item under every type a front end may choose from; nothing in a plain script."""
    if shell() is not None:
        from IPython.display import publish_display_data

        publish_display_data(bundle(item))


def cell_name() -> str:
    """The running cell as a reader counts it, ``cell [7]``; empty in a plain script."""
    running = shell()
    return f"cell [{_count(running)}]" if running is not None else ""


def cell_key() -> tuple[str, int]:
    """The id of the running cell, where the front end sends one, and the count of this execution."""
    running = shell()
    if running is None:
        return "", 0
    header = getattr(running, "parent_header", None) or {}
    return str(header.get("metadata", {}).get("cellId", "")), _count(running)


def _count(running: Any) -> int:
    # IPython counts on before the cell runs or after it, by its version; its list of inputs ends with the running one.
    inputs = getattr(running, "user_ns", {}).get("In", ())
    return len(inputs) - 1 if len(inputs) > 1 else int(running.execution_count)


def short_errors() -> None:
    """Show calcpack's own errors as their message, without the traceback of our code."""
    running = shell()
    if running is not None and hasattr(running, "set_custom_exc"):
        running.set_custom_exc((CalcpackError,), _show_error)


def _show_error(
    running: Any, kind: type[BaseException], error: BaseException, trace: TracebackType | None, **_: Any
) -> None:
    running._showtraceback(kind, error, [*filter(None, (f"{kind.__name__}: {error}", _cell_line(trace)))])


def _cell_line(trace: TracebackType | None) -> str:
    """The line of the cell that led to an error; empty where it cannot be told."""
    while trace is not None:
        name = trace.tb_frame.f_code.co_filename
        if "ipykernel_" in name or name.startswith("<ipython-input"):
            return f"in line {trace.tb_lineno}: {linecache.getline(name, trace.tb_lineno).strip()}"
        trace = trace.tb_next
    return ""


_watched: set[str] = set()
# What the tool writes, hidden folders, and Python's own files.
_FOREIGN = re.compile(r"draft/|record/|(.*/)?(\.|__pycache__/|site-packages/)")


def watch_files(root: Path) -> None:
    """Note every file of the job that a notebook opens by itself, so that a change of the file runs it again."""
    target = os.environ.get("CALCPACK_OPENED")
    if not target or str(root) in _watched:
        return
    _watched.add(str(root))
    prefix = str(root) + os.sep

    def note(opened: Any) -> None:
        """Note a file of the job that was opened."""
        path = os.path.abspath(opened)  # noqa: PTH100 - pathlib is too slow for every open of a process
        name = path[len(prefix) :].replace(os.sep, "/")
        if path.startswith(prefix) and not _FOREIGN.match(name) and not _quiet:
            with Path(target).open("a", encoding="utf-8") as notes:
                notes.write(name + "\n")

    def hook(event: str, arguments: tuple[Any, ...]) -> None:
        """See every file that the process opens."""
        if event == "open" and isinstance(arguments[0], (str, os.PathLike)):
            note(arguments[0])

    # Modules of the job's own, imported before the sheet was made.
    for module in list(sys.modules.values()):
        if file := getattr(module, "__file__", None):
            note(file)
    sys.addaudithook(hook)


_quiet: list[str] = []


class reading_inputs:
    """While this holds, reads of input files are noted row by row by the caller and not as whole files."""

    def __enter__(self) -> None:
        _quiet.append("")

    def __exit__(self, *_: object) -> None:
        _quiet.pop()
