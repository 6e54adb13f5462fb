"""Reinforcing bars of ASTM A615 and A706: sizes, nominal dimensions and grades."""

from __future__ import annotations

from dataclasses import dataclass

from calcpack.aci318.standards import ASTM_A615, ASTM_A706
from calcpack.errors import Problem, TableError
from calcpack.formula import Standard

__all__ = ["BARS", "GRADES", "NO_11", "Bar", "bar", "standards_of_grade"]


@dataclass(frozen=True)
class Bar:
    """A bar by its designation number, with nominal dimensions.

    Attributes
    ----------
    size : designation, 8 for No. 8
    d_b : nominal diameter, in
    A_b : nominal area, in^2
    weight : nominal weight, lb/ft, as the standard lists it
    """

    size: int
    d_b: float
    A_b: float
    weight: float

    def __str__(self) -> str:
        return f"No. {self.size}"


# The areas are the standard's two-decimal values, not pi*d_b**2/4.
_ROWS = (
    (3, 0.375, 0.11, 0.376),
    (4, 0.500, 0.20, 0.668),
    (5, 0.625, 0.31, 1.043),
    (6, 0.750, 0.44, 1.502),
    (7, 0.875, 0.60, 2.044),
    (8, 1.000, 0.79, 2.670),
    (9, 1.128, 1.00, 3.400),
    (10, 1.270, 1.27, 4.303),
    (11, 1.410, 1.56, 5.313),
    (14, 1.693, 2.25, 7.650),
    (18, 2.257, 4.00, 13.60),
)

BARS: dict[int, Bar] = {row[0]: Bar(*row) for row in _ROWS}

NO_11 = BARS[11]

GRADES: dict[Standard, tuple[float, ...]] = {
    ASTM_A615: (40_000.0, 60_000.0, 80_000.0, 100_000.0),
    ASTM_A706: (60_000.0, 80_000.0, 100_000.0),
}


def bar(size: int) -> Bar:
    """The bar of that designation.

    >>> bar(8).A_b
    0.79

    Raises
    ------
    TableError : no such size
    """
    if size not in BARS:
        allowed = ", ".join(f"#{known}" for known in BARS)
        raise TableError("unknown bar size", [Problem(f"bar #{size}", f"one of {allowed} (ASTM A615, A706)")])
    return BARS[size]


def standards_of_grade(f_y: float) -> tuple[Standard, ...]:
    """The bar standards that have a grade of this yield strength, in psi; empty where none has."""
    return tuple(standard for standard, grades in GRADES.items() if f_y in grades)
