"""The lines of a formula in symbols alone, every branch with its condition, as they stand above a worked table."""

from __future__ import annotations

import ast
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from typing import Any

from calcpack.formula import Formula
from calcpack.formula_source import Branch, Line, opposite
from calcpack.typeset.emit import Target, emit
from calcpack.typeset.layout import Layout
from calcpack.typeset.names import name_tree
from calcpack.typeset.rows import COLUMN, broken, width, with_symbols
from calcpack.typeset.store import FormulaLayout

__all__ = ["GeneralLine", "general_lines"]


@dataclass(frozen=True)
class GeneralLine:
    """A line in symbols: what it sets, its right side, and the conditions under which it holds."""

    symbol: str
    layout: Layout
    conditions: tuple[Layout, ...] = ()

    def to_json(self) -> dict[str, Any]:
        """Plain data, for a notebook's output."""
        conditions = [layout.to_json() for layout in self.conditions]
        return {"symbol": self.symbol, "layout": self.layout.to_json(), "conditions": conditions}

    @classmethod
    def from_json(cls, data: Mapping[str, Any]) -> GeneralLine:
        """The line that `to_json` wrote."""
        conditions = tuple(Layout.from_json(layout) for layout in data["conditions"])
        return cls(data["symbol"], Layout.from_json(data["layout"]), conditions)

    def rows(self, target: Target) -> list[tuple[str, str]]:
        """Its rows as (left, right) pairs, aligned at the sign that opens the right part."""
        left = name_tree(self.symbol)
        parts = broken(with_symbols(self.layout), COLUMN - width(left) - 1)
        signs = [f"{target.operator('=')} ", *[""] * (len(parts) - 1)]
        return [
            ("" if index else emit(left, target), f"{sign}{emit(part, target)} ")
            for index, (sign, part) in enumerate(zip(signs, parts, strict=True))
        ]

    @property
    def wide(self) -> bool:
        """Whether a row stays wider than its column where it is broken as far as it can be."""
        limit = COLUMN - width(name_tree(self.symbol)) - 1
        return any(width(part) > limit for part in broken(with_symbols(self.layout), limit))


def general_lines(formula: Formula, layouts: FormulaLayout) -> list[GeneralLine]:
    """Every line of a formula, whatever the branch, with the conditions that lead to it."""
    return [
        GeneralLine(line.target, layouts.lines[line.index], tuple(layouts.conditions[ast.unparse(t)] for t in tests))
        for line, tests in _paths(formula.body, ())
    ]


def _paths(body: Iterable[Line | Branch], tests: tuple[ast.expr, ...]) -> Iterator[tuple[Line, tuple[ast.expr, ...]]]:
    for item in body:
        if isinstance(item, Line):
            yield item, tests
        else:
            yield from _paths(item.then, (*tests, item.condition))
            yield from _paths(item.otherwise, (*tests, opposite(item.condition)))
