"""Where the values of a schedule come from, in words: the drawing that its row names, and the row itself."""

from __future__ import annotations

from typing import Protocol

__all__ = ["NOMINAL", "PlacedLike", "position", "source_text"]

NOMINAL = "ASTM A615 and A706, nominal dimensions"


class PlacedLike(Protocol):
    """A record that knows the row of the file it was read from."""

    @property
    def file(self) -> str:
        """Where the row stands; empty where it was not read from a file."""
        ...

    @property
    def row(self) -> int:
        """Its number in the file, 0 where it has none."""
        ...


def position(record: PlacedLike, otherwise: str) -> str:
    """Where a record stands: ``inputs/anchorage.csv, row 14``; `otherwise` where it was not read from a file."""
    if not record.file:
        return otherwise
    return f"{record.file}, row {record.row}" if record.row else record.file


def source_text(source: str, where: str) -> str:
    """The source that a row states and the row: ``S-301, detail 1, rev 2 (inputs/anchorage.csv, row 2)``."""
    return f"{source.strip()} ({where})" if source.strip() else where
