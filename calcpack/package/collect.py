"""From executed notebooks to the content of a package: sheets in order, and one ledger over all of them."""

from __future__ import annotations

import hashlib
from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Any

from calcpack.items import stored_items
from calcpack.ledger import Entry, Ledger
from calcpack.package.run import Executed

__all__ = ["Content", "SheetContent", "collect"]


@dataclass(frozen=True)
class SheetContent:
    """One sheet.

    Attributes
    ----------
    id, subject : as in its title block
    path : of its notebook, relative to the job
    notebook : executed
    reason : why it ran, empty where the last run still held
    """

    id: str
    subject: str
    path: str
    notebook: Any
    reason: str


@dataclass(frozen=True)
class Content:
    """What a package is made from."""

    sheets: tuple[SheetContent, ...]
    ledger: Ledger

    def sheet_hash(self, sheet: str) -> str:
        """A digest over the hashes of a sheet's entries: what a check of that sheet covers."""
        digest = hashlib.sha256()
        for entry in self.ledger:
            if entry.sheet == sheet:
                digest.update(self.ledger.hash(entry.id).encode())
        return digest.hexdigest()


def collect(executed: Sequence[Executed]) -> Content:
    """Gather the sheets and their entries.

    Raises
    ------
    LedgerError : an id twice, a reference to nothing, a circular reference
    """
    sheets, entries = [], []
    confirmed: dict[str, list[str]] = {}
    for run in executed:
        subject = ""
        for item in stored_items(run.notebook):
            if item["type"] == "sheet":
                subject = item["subject"]
            entries += [Entry.from_json(data) for data in item["entries"]]
            confirmed.update(dict(item.get("confirms", ())))
        sheets.append(SheetContent(run.id, subject, run.path, run.notebook, run.reason))
    entries = [replace(entry, confirmed_by=tuple(confirmed.get(entry.id, entry.confirmed_by))) for entry in entries]
    return Content(tuple(sheets), Ledger.from_json(entry.to_json() for entry in entries))
