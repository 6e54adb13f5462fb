"""Values carried from one sheet to another: what each sheet's last run left for the others."""

from __future__ import annotations

import json
import os
from collections.abc import Iterable, Mapping, Sequence
from pathlib import Path
from typing import Any

from calcpack.errors import NeedsSheet, Problem, SheetError
from calcpack.items import stored_items
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
    left = _left(root, sheet)
    if left is None:
        problem = Problem(f"sheet {sheet} has no results", "a sheet that has run", "run it first, or: calcpack draft")
        error = NeedsSheet(f"needs sheet {sheet}", [problem], place)
        error.sheet = sheet
        raise error
    found = [item for item in left if name in (item["symbol"], item["id"])]
    if len(found) != 1:
        names = ", ".join(item["id"] for item in found) or "none"
        problem = Problem(f"{name} of sheet {sheet}: {names}", "exactly one value of that name", "carry it by its id")
        raise SheetError("carry", [problem], place)
    entry = Entry.from_json(found[0])
    return Value(entry, dimension_of(entry.unit), entry.sheet), str(found[0]["hash"])


def _left(root: Path, sheet: str) -> list[dict[str, Any]] | None:
    """What the last run of a sheet left; at an author's desk, else what is stored in its notebook."""
    path = results_folder(root) / f"{sheet}.json"
    if path.is_file():
        return list(json.loads(path.read_text("utf-8")))
    return None if "CALCPACK_RESULTS" in os.environ else _stored(root, sheet)


def _stored(root: Path, sheet: str) -> list[dict[str, Any]] | None:
    for path in sorted((root / "sheets").glob("*.ipynb")):
        try:
            items = list(stored_items(json.loads(path.read_bytes())))
        except (ValueError, LookupError, TypeError, AttributeError):
            continue  # no notebook, or one that is being saved
        if any(item["type"] == "sheet" and item["id"] == sheet for item in items):
            return _hashed(items)
    return None


def _hashed(items: Sequence[Mapping[str, Any]]) -> list[dict[str, Any]]:
    ledger = Ledger()
    for item in items:
        for key, digest in item.get("reads", ()):
            if key.startswith("sheet "):
                ledger.admit(key.split(" ", 2)[2], digest)
        for data in item["entries"]:
            ledger.add(Entry.from_json(data))
    return ledger.to_json()
