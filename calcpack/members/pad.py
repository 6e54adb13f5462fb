"""The calculation pad: a check procedure is written once and worked on any pad, with or without printing."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from typing import Protocol, TypeVar

from calcpack.formula import Formula
from calcpack.tabulation import FloatBench, Row, Tabulated, Tabulation, tabulate

__all__ = ["FloatPad", "Pad"]

T = TypeVar("T")


class Pad(Protocol[T]):
    """Where a procedure states values, works equations and gives reasons, in the order an engineer writes them.

    `T` is what stands for a value: a float in bulk, a ledger entry on a sheet.
    """

    def given(self, symbol: str, value: float, means: str, source: str) -> T:
        """State a value, in coherent units, with what it means and where it comes from."""
        ...

    def work(self, formula: Formula, **values: T) -> T:
        """Work one equation."""
        ...

    def tabulate(self, table: Tabulation, rows: Sequence[Row[T]], shared: Mapping[str, T]) -> Tabulated[T]:
        """Work the same equations for many rows."""
        ...

    def solved(self, symbol: str, value: float, means: str, method: str, clause: str, solved_from: Sequence[T]) -> T:
        """State a value found by iteration from others; `confirm` then names what confirms it."""
        ...

    def confirm(self, solved: Sequence[T], by: Sequence[T]) -> None:
        """Name the differences, as ratios, that vanish where solved values are right."""
        ...

    def figure(self, draw: Callable[[], object]) -> None:
        """Show a figure; it is drawn only where it is printed."""
        ...

    def number(self, value: T) -> float:
        """The number behind a value, in coherent units."""
        ...

    def reason(self, text: str) -> None:
        """Say why the next step is taken."""
        ...

    def verify(self, what: str, demand: T, capacity: T, clause: str) -> float:
        """Compare two values of one dimension, the capacity above zero, and return demand over capacity.

        For a least value that has to be provided, the least value is the demand and what is provided the capacity.
        """
        ...

    def heading(self, text: str) -> None:
        """Head the steps that follow."""
        ...


class FloatPad:
    """A pad of plain floats: nothing is kept, for checks in bulk."""

    def given(self, symbol: str, value: float, means: str, source: str) -> float:
        """The value itself."""
        del symbol, means, source
        return value

    def work(self, formula: Formula, **values: float) -> float:
        """The result of the formula."""
        return formula(**values)

    def tabulate(self, table: Tabulation, rows: Sequence[Row[float]], shared: Mapping[str, float]) -> Tabulated[float]:
        """The values of the rows, and the totals."""
        return tabulate(table, rows, shared, FloatBench())

    def solved(
        self, symbol: str, value: float, means: str, method: str, clause: str, solved_from: Sequence[float]
    ) -> float:
        """The value itself."""
        del symbol, means, method, clause, solved_from
        return value

    def confirm(self, solved: Sequence[float], by: Sequence[float]) -> None:
        """Dropped."""

    def figure(self, draw: Callable[[], object]) -> None:
        """Not drawn."""

    def number(self, value: float) -> float:
        """The value itself."""
        return value

    def reason(self, text: str) -> None:
        """Dropped."""

    def verify(self, what: str, demand: float, capacity: float, clause: str) -> float:
        """Demand over capacity."""
        del what, clause
        return demand / capacity

    def heading(self, text: str) -> None:
        """Dropped."""
