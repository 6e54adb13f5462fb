"""Results of checks."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from functools import cache

from calcpack.ledger import passes
from calcpack.symbols import lookup
from calcpack.units import convert, display_unit

__all__ = ["CheckResult", "Requirement", "measured", "verdict_of"]


@dataclass(frozen=True)
class CheckResult:
    """One check of one member.

    Attributes
    ----------
    ratio : demand over capacity, or None where there is nothing to compare
    verdict : ``OK``, ``NG``, or empty where the check states a value only or cannot be decided
    values : symbol to (number, unit), unrounded
    notes : what a reader has to know beside the numbers: a condition not met, a reduction not taken
    """

    mark: str
    check: str
    clause: str
    combination: str
    ratio: float | None
    verdict: str
    values: Mapping[str, tuple[float | None, str]] = field(default_factory=dict)
    notes: tuple[str, ...] = ()


@dataclass(frozen=True)
class Requirement:
    """A condition that the detail has to meet beside its length."""

    clause: str
    text: str
    met: bool

    def __str__(self) -> str:
        return f"{self.text} ({self.clause})"


def verdict_of(ratio: float | None, met: bool = True) -> str:
    """``OK`` for a ratio up to 1, ``NG`` above it or where a condition is not met, empty where there is no ratio."""
    if not met:
        return "NG"
    if ratio is None:
        return ""
    return "OK" if passes(ratio) else "NG"


def measured(symbol: str, value: float) -> tuple[float, str]:
    """A coherent value as number and display unit: forces in kip, lengths in inches."""
    unit = _unit(symbol)
    return (convert(value, unit), unit) if unit else (value, "")


@cache
def _unit(symbol: str) -> str:
    return display_unit(lookup(symbol).dimension)
