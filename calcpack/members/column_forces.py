"""The forces of a column on a pad: each value of a combination is stated, or worked from its loads, once."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field
from typing import Any, Generic, TypeVar

from calcpack.members.column_like import ForceLike
from calcpack.members.column_loads import work_forces
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.pad import Pad

__all__ = ["ForceValues"]

T = TypeVar("T")


class ForceValues(Generic[T]):
    """Values of the forces of one column by their symbols, each stated when it is first asked for."""

    def __init__(self, work: ColumnWorking[T]) -> None:
        self.work = work
        self._pad: Any = _Once(work.pad)
        self._made: dict[int, tuple[ForceLike, dict[str, T]]] = {}

    def __call__(self, force: ForceLike, symbols: Sequence[str]) -> dict[str, T]:
        """The values of one force by the symbols asked for: ``P_u``, ``M_ux``, ``V_uy``, …"""
        _, made = self._made.setdefault(id(force), (force, {}))
        missing = [symbol for symbol in symbols if symbol not in made]
        if missing:
            made.update(work_forces(self._pad, self.work.column, force, missing))
        return {symbol: made[symbol] for symbol in symbols if symbol in made}


@dataclass
class _Once(Generic[T]):
    """A pad on which a row of the force table is stated once, however many combinations it stands in."""

    pad: Pad[T]
    _stated: dict[tuple[str, float, str, str], T] = field(default_factory=dict)

    def given(self, symbol: str, value: float, means: str, source: str) -> T:
        """State a value, or take it as it was stated before."""
        key = symbol, value, means, source
        if key not in self._stated:
            self._stated[key] = self.pad.given(symbol, value, means, source)
        return self._stated[key]

    def __getattr__(self, name: str) -> Any:
        return getattr(self.pad, name)
