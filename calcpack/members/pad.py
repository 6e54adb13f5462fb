"""The calculation pad: a check procedure is written once and worked on any pad, with or without printing."""

from __future__ import annotations

from typing import Protocol, TypeVar

from calcpack.formula import Formula

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
