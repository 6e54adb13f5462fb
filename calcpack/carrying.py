"""Values carried from one sheet to another: what each sheet's last run left for the others."""

from __future__ import annotations

import json
import os
from collections.abc import Iterable
from pathlib import Path

from calcpack.errors import NeedsSheet, Problem, SheetError
from calcpack.ledger import Entry, Ledger
from calcpack.units import dimension_of
from calcpack.value import Value

__all__ = ["carried", "leave", "results_folder"]


def results_folder(root: Path) -> Path:
    """Where the results of the last run of each sheet stand."""
    return Path(os.environ.get("CALCPACK_RESULTS") or root / ".calcpack" / "results")


def leave(folder: Path, sheet: str, ledger: Ledger, entries: Iterable[Entry]) -> None:
    """Leave a sheet's entries, with their hashes, for sheets that carry from it."""
    folder.mkdir(parents=True, exist_ok=True)
    data = [{**entry.to_json(), "hash": ledger.hash(entry.id)} for entry in entries]
    (folder / f"{sheet}.json").write_text(json.dumps(data, ensure_ascii=False), "utf-8")


def carried(root: Path, sheet: str, name: str, place: str) -> tuple[Value, str]:
    """The value called `name` of another sheet, and its content hash.

    Raises
    ------
    NeedsSheet : the sheet has left no results
    SheetError : it has no value, or several, of that name
    """
    path = results_folder(root) / f"{sheet}.json"
    if not path.is_file():
        problem = Problem(f"sheet {sheet} has no results", "a sheet that has run", "run it first, or: calcpack draft")
        error = NeedsSheet(f"needs sheet {sheet}", [problem], place)
        error.sheet = sheet
        raise error
    found = [item for item in json.loads(path.read_text("utf-8")) if name in (item["symbol"], item["id"])]
    if len(found) != 1:
        names = ", ".join(item["id"] for item in found) or "none"
        problem = Problem(f"{name} of sheet {sheet}: {names}", "exactly one value of that name", "carry it by its id")
        raise SheetError("carry", [problem], place)
    entry = Entry.from_json(found[0])
    return Value(entry, dimension_of(entry.unit), entry.sheet), str(found[0]["hash"])
