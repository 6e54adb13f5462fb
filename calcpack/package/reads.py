"""Digests of what a notebook may read from a job, as they stand now."""

from __future__ import annotations

import hashlib
from collections.abc import Callable
from dataclasses import dataclass
from functools import cached_property
from pathlib import Path
from typing import Any

from calcpack.job import Job, row_digest
from calcpack.job.length_settings import lengths_of
from calcpack.job.schedules import read_columns, read_forces, read_stories, read_terminations

__all__ = ["Inputs", "file_digest"]


_READERS: dict[str, Callable[[Path], tuple[Any, ...]]] = {
    "anchorage": read_terminations,
    "columns": read_columns,
    "forces": read_forces,
    "stories": read_stories,
}


@dataclass(frozen=True)
class Inputs:
    """The inputs of a job at one moment; each table is read at most once."""

    job: Job

    def digest(self, key: str) -> str:
        """The digest of what `key` names: ``job codes``, ``job lengths``, ``givens q``, ``anchorage T1``."""
        kind, _, name = key.partition(" ")
        if (kind, name) == ("job", "lengths"):
            return repr(lengths_of(self.job))
        if kind == "job":
            return repr({"codes": self.job.codes, "settings": (self.job.combining, self.job.columns)}[name])
        if kind == "givens":
            return "".join(row_digest(row) for row in self.job.givens if row.symbol == name)
        named = "story" if kind == "stories" else "mark"
        return "".join(row_digest(row) for row in self.tables(kind) if getattr(row, named) == name)

    def tables(self, kind: str) -> tuple[Any, ...]:
        """The rows of a table, by its kind."""
        if kind not in self._tables:
            self._tables[kind] = _READERS[kind](self.job.root)
        return self._tables[kind]

    @cached_property
    def _tables(self) -> dict[str, tuple[Any, ...]]:
        return {}


def file_digest(path: Path) -> str:
    """SHA-256 of a file; empty where it is not there."""
    return hashlib.sha256(path.read_bytes()).hexdigest() if path.is_file() else ""
