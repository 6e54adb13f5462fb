"""Workings that are not printed: one line that carries their entries, so that every number can still be traced."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any

__all__ = ["folded"]


def folded(items: Sequence[Mapping[str, Any]], text: str) -> dict[str, Any]:
    """One line in place of items; ``{count}`` in its text is how many values they hold."""
    entries = [entry for item in items for entry in item["entries"]]
    return {
        "type": "note",
        "style": "reason",
        "entries": entries,
        "reads": [read for item in items for read in item["reads"]],
        "confirms": [pair for item in items for pair in item.get("confirms", ())],
        "parts": [{"text": text.format(count=len(entries)), "link": "", "sheet": ""}],
    }
