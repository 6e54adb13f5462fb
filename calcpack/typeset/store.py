"""Layouts of whole formulas, made once and kept between runs under a digest of the formula's source."""

from __future__ import annotations

import json
import os
from dataclasses import dataclass, field
from functools import cache
from importlib import metadata
from pathlib import Path
from typing import Any

from calcpack.formula import Formula
from calcpack.formula_source import opposite
from calcpack.typeset.layout import Layout, lay_out

__all__ = ["FormulaLayout", "LayoutStore"]

_VERSION = 4  # raise it when layouts of the same source change


@dataclass(frozen=True)
class FormulaLayout:
    """The layouts of a formula: of each line by its index, of each condition and its opposite by its text."""

    lines: dict[int, Layout]
    conditions: dict[str, Layout]


@dataclass
class LayoutStore:
    """Layouts by formula; mutable, because it grows as formulas are met. `path` keeps them between runs."""

    path: Path | None = None
    _kept: dict[str, Any] = field(default_factory=dict)
    _ready: dict[str, FormulaLayout] = field(default_factory=dict)
    _changed: bool = False

    def __post_init__(self) -> None:
        if self.path is not None and self.path.is_file():
            try:
                kept = json.loads(self.path.read_text("utf-8"))
            except (OSError, ValueError):
                kept = {}
            self._kept = kept if isinstance(kept, dict) else {}

    def layout(self, formula: Formula) -> FormulaLayout:
        """The layout of a formula, from memory, from the kept file, or made and proved now.

        Raises
        ------
        LayoutError : a line whose layout does not compute what the line computes
        """
        key = f"{formula.key}-{_VERSION}-{_handcalcs_version()}"
        if key not in self._ready:
            self._ready[key] = self._read(key, formula) or self._make(key, formula)
        return self._ready[key]

    def _read(self, key: str, formula: Formula) -> FormulaLayout | None:
        """The kept layout; ``None`` where there is none, or it is damaged."""
        try:
            layout = _from_json(self._kept[key])
        except (AttributeError, KeyError, TypeError, ValueError):
            return None
        return layout if set(layout.lines) == {line.index for line in formula.lines()} else None

    def _make(self, key: str, formula: Formula) -> FormulaLayout:
        layout = _made(formula)
        self._kept[key] = _to_json(layout)
        self._changed = True
        return layout

    def save(self) -> None:
        """Write what is new; the file is replaced in one step, so two runs at once cannot tear it."""
        if self.path is None or not self._changed:
            return
        self.path.parent.mkdir(parents=True, exist_ok=True)
        partial = self.path.with_name(f"{self.path.name}.{os.getpid()}")
        partial.write_text(json.dumps(self._kept, sort_keys=True, separators=(",", ":")), "utf-8")
        partial.replace(self.path)
        self._changed = False


@cache
def _handcalcs_version() -> str:
    return metadata.version("handcalcs")


def _made(formula: Formula) -> FormulaLayout:
    import ast

    tests = [side for test in formula.conditions() for side in (test, opposite(test))]
    return FormulaLayout(
        {line.index: lay_out(line.value) for line in formula.lines()},
        {ast.unparse(test): lay_out(test) for test in tests},
    )


def _to_json(layout: FormulaLayout) -> dict[str, Any]:
    return {
        "lines": {str(index): item.to_json() for index, item in layout.lines.items()},
        "conditions": {text: item.to_json() for text, item in layout.conditions.items()},
    }


def _from_json(data: dict[str, Any]) -> FormulaLayout:
    return FormulaLayout(
        {int(index): Layout.from_json(item) for index, item in data["lines"].items()},
        {text: Layout.from_json(item) for text, item in data["conditions"].items()},
    )
