"""How the trade writes a dimension and a scale, and how a figure refuses what cannot be drawn."""

from __future__ import annotations

import math
from collections.abc import Iterator
from fractions import Fraction

from calcpack.errors import Problem, RangeError

__all__ = ["Refusal", "feet_inches", "inches", "scale_note", "scale_that_fits"]

# Inches of the building in one inch of paper: detail and architectural scales (3 in to 1/16 in a foot), then
# 1 in = 20 ft and up; common practice.
_SCALES = (4, 8, 12, 16, 24, 32, 48, 64, 96, 128, 192, 240, 360, 480, 600)
_SIXTEENTH = Fraction(1, 16)


def inches(value: float) -> str:
    """A length in inches as a fraction where it is one, ``2 1/2``; otherwise with two decimals, ``2.54``."""
    nearest = round(value / float(_SIXTEENTH)) * _SIXTEENTH
    # Bar sizes and rounded inputs differ from a sixteenth by less than anyone can set out.
    if abs(float(nearest) - value) > 0.002:
        return f"{value:.2f}".rstrip("0")
    whole, rest = divmod(nearest, 1)
    return " ".join(part for part in (str(whole) if whole or not rest else "", str(rest) if rest else "") if part)


def feet_inches(value: float) -> str:
    """A length in inches in trade style: ``2 1/2"``, ``1'-6"``, ``12'-0 1/2"``.

    >>> feet_inches(18.0)
    '1\\'-6"'
    """
    if value < 0:
        return "-" + feet_inches(-value)
    feet, rest = divmod(value, 12.0)
    # 23.9999 in is two feet, not 1'-12".
    if rest > 12.0 - 0.002:
        feet, rest = feet + 1, 0.0
    text = inches(rest)
    if not feet:
        return f'{text}"'
    return f"{feet:.0f}'-{text if rest >= 1 or text == '0' else '0 ' + text}\""


def scale_that_fits(width: float, height: float, paper_width: float, paper_height: float) -> float:
    """The largest trade scale at which `width` by `height` goes on the paper; all lengths in inches."""
    needed = max(width / paper_width, height / paper_height)
    return float(next((scale for scale in _SCALES if scale >= needed), math.ceil(needed / 120) * 120))


def scale_note(scale: float) -> str:
    """The scale as it is written under a drawing."""
    return f"Scale 1 in = {scale / 12:g} ft" if scale >= 48 and scale % 12 == 0 else f"Scale 1 in = {scale:g} in"


class Refusal:
    """Collects everything that is wrong with a figure's input, to say it at once."""

    def __init__(self, figure: str) -> None:
        self._figure = figure
        self._problems: list[Problem] = []

    def positive(self, **lengths: float) -> None:
        """Each of `lengths`, in inches, has to be a finite number above zero."""
        for name, value in lengths.items():
            self.unless(
                math.isfinite(value) and value > 0, f"{name} = {value:g} in", "a length above 0 in", "correct it"
            )

    def unless(self, holds: bool, given: str, allowed: str, remedy: str = "") -> None:
        """Note a problem where `holds` is false."""
        if not holds:
            self._problems.append(Problem(given, allowed, remedy))

    def __iter__(self) -> Iterator[Problem]:
        return iter(self._problems)

    def settle(self) -> None:
        """Raise what was collected.

        Raises
        ------
        RangeError : something was wrong; holds every problem
        """
        if self._problems:
            raise RangeError(f"{self._figure} cannot be drawn", self._problems)
