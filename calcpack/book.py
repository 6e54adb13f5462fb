"""The record a sheet keeps: entries and values in order, their ids, and what each cell set."""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from contextlib import contextmanager
from dataclasses import dataclass, field
from typing import Any

from calcpack import notebook, symbols
from calcpack.errors import Problem, SheetError
from calcpack.ledger import Entry, Ledger
from calcpack.typeset.line import Origin
from calcpack.units import Dimension
from calcpack.value import Value

__all__ = ["SheetBook"]


@dataclass
class SheetBook:
    """Record keeping of a sheet; `calcpack.sheet.Sheet` adds what an author calls."""

    id: str
    subject: str
    ledger: Ledger = field(default_factory=Ledger, repr=False, kw_only=True)
    _values: dict[str, Value] = field(default_factory=dict, repr=False, kw_only=True)
    _held: list[dict[str, Any]] | None = field(default=None, repr=False, kw_only=True)
    _cells: dict[str, tuple[int, list[Entry]]] = field(default_factory=dict, repr=False, kw_only=True)

    def values(self, symbol: str) -> tuple[Value, ...]:
        """The sheet's values of a symbol, in order of appearance."""
        return tuple(value for value in self._values.values() if value.entry.symbol == symbol)

    def table(self, head: Sequence[str], rows: Sequence[Sequence[str | Value]], caption: str = "") -> None:
        """A table of texts and values; values link to where they were set."""
        if any(len(row) != len(head) for row in rows):
            problem = Problem(
                f"rows of {sorted({len(row) for row in rows})} cells", f"{len(head)} cells, one for each head", ""
            )
            raise SheetError("table", [problem], self._place())
        cells = [[self._part(cell) for cell in row] for row in rows]
        self._show("table", head=[self._part(cell) for cell in head], rows=cells, caption=caption)

    def _free_ids(self, names: Sequence[str]) -> list[str]:
        taken = {entry.id for entry in self.ledger}
        free = []
        for name in names:
            count, identifier = 1, f"{self.id}/{name}"
            while identifier in taken:
                count += 1
                identifier = f"{self.id}/{name}.{count}"
            taken.add(identifier)
            free.append(identifier)
        return free

    def _keep(self, entry: Entry, dimension: Dimension) -> Value:
        self.ledger.add(entry)
        value = Value(entry, dimension, self.id)
        self._values[entry.id] = value
        key, count = notebook.cell_key()
        self._cells.setdefault(key, (count, []))[1].append(entry)
        return value

    def _begin(self) -> None:
        """Forget what an earlier execution of the same cell set, so that a cell can be run again."""
        key, count = notebook.cell_key()
        if not key or self._cells.get(key, (count, []))[0] == count:
            return
        stale = {entry.id for entry in self._cells.pop(key)[1]}
        stale |= {user for identifier in stale for user in self.ledger.above(identifier)}
        kept = [entry for entry in self.ledger if entry.id not in stale]
        here = {entry.id for entry in kept}
        self._values = {key: value for key, value in self._values.items() if key in here or value.sheet != self.id}
        renewed = Ledger()
        renewed.admit_all(self.ledger)
        for entry in kept:
            renewed.add(entry)
        self.ledger = renewed
        # An id that is free again may come back in another cell: no cell may still count it as its own.
        for _, entries in self._cells.values():
            entries[:] = [entry for entry in entries if entry.id in here]

    def _place(self) -> str:
        cell = notebook.cell_name()
        return f"sheet {self.id}, {cell}" if cell else f"sheet {self.id}"

    def _show(self, kind: str, entries: Sequence[Entry] = (), reads: Sequence[Any] = (), **item: Any) -> None:
        made = {"type": kind, "entries": [entry.to_json() for entry in entries], "reads": list(reads), **item}
        if self._held is None:
            notebook.show(made)
        else:
            self._held.append(made)

    @contextmanager
    def _holding(self) -> Iterator[list[dict[str, Any]]]:
        """While this holds, items are collected and not shown."""
        outer, self._held = self._held, []
        try:
            yield self._held
        finally:
            self._held = outer

    def _named(self, text: str) -> list[dict[str, str]]:
        """A text in which names of the notation table stand as symbols."""
        pieces = re.split(r"\b([A-Za-z]+(?:_[A-Za-z0-9]+)+)\b", text)
        return [
            {**self._part(piece), "symbol": piece} if index % 2 and symbols.is_known(piece) else self._part(piece)
            for index, piece in enumerate(pieces)
            if piece
        ]

    def _part(self, part: str | Value) -> dict[str, str]:
        if isinstance(part, Value):
            return {
                "text": part.entry.shown,
                "link": part.entry.id,
                "sheet": "" if part.sheet == self.id else part.sheet,
            }
        return {"text": str(part), "link": "", "sheet": ""}

    def _side(self, value: Value) -> dict[str, str]:
        return {"symbol": value.entry.symbol, "shown": value.entry.shown, **self._part(value)}

    def _origin(self, value: Value) -> Origin:
        return Origin(value.entry.id, "" if value.sheet == self.id else value.sheet)
