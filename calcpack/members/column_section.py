"""What the checks of columns read: one row of the column schedule and its forces."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Protocol

from calcpack.members.sources import position, source_text

__all__ = [
    "Bars",
    "BarsLike",
    "Column",
    "ColumnLike",
    "Force",
    "ForceLike",
    "Ties",
    "TiesLike",
    "force_source",
    "row_of",
    "section_source",
]


class BarsLike(Protocol):
    """The longitudinal bars of a column."""

    @property
    def count(self) -> int:
        """How many."""
        ...

    @property
    def size(self) -> int:
        """Designation number."""
        ...

    @property
    def n_x(self) -> int | None:
        """Along each face parallel to x, corners included; None on a circle."""
        ...

    @property
    def n_y(self) -> int | None:
        """Along each face parallel to y, corners included; None on a circle."""
        ...


class TiesLike(Protocol):
    """The ties or the spiral of a column."""

    @property
    def kind(self) -> str:
        """``ties`` or ``spiral``."""
        ...

    @property
    def size(self) -> int:
        """Designation number."""
        ...

    @property
    def spacing(self) -> float:
        """Centre to centre, or pitch, in."""
        ...


class ColumnLike(Protocol):
    """A column of the schedule, in coherent units."""

    @property
    def mark(self) -> str:
        """Mark of the column."""
        ...

    @property
    def b(self) -> float | None:
        """Width along x, in; None in a circular column."""
        ...

    @property
    def h(self) -> float:
        """Depth along y, or diameter, in."""
        ...

    @property
    def bars(self) -> BarsLike:
        """Longitudinal bars."""
        ...

    @property
    def ties(self) -> TiesLike:
        """Ties or spiral."""
        ...

    @property
    def cover(self) -> float:
        """Clear, to ties or spiral, in."""
        ...

    @property
    def f_c(self) -> float:
        """In psi."""
        ...

    @property
    def f_y(self) -> float:
        """In psi."""
        ...

    @property
    def f_yt(self) -> float | None:
        """In psi; None where it is f_y."""
        ...

    @property
    def aggregate(self) -> float | None:
        """Nominal maximum size, in."""
        ...

    @property
    def l_u(self) -> float | None:
        """Unsupported length, in."""
        ...

    @property
    def source(self) -> str:
        """Drawing and revision that the row states; may be empty."""
        ...

    @property
    def file(self) -> str:
        """Where the row stands."""
        ...

    @property
    def row(self) -> int:
        """Its number in the file."""
        ...


class ForceLike(Protocol):
    """Factored forces of one combination, in lb and lb*in, compression positive."""

    @property
    def combination(self) -> str | None:
        """Name of the combination."""
        ...

    @property
    def P(self) -> float:
        """Axial force."""
        ...

    @property
    def Mx(self) -> float | None:
        """Moment about x; None where it is given by its ends."""
        ...

    @property
    def My(self) -> float | None:
        """Moment about y; None where it is given by its ends."""
        ...

    @property
    def Vx(self) -> float:
        """Shear along x."""
        ...

    @property
    def Vy(self) -> float:
        """Shear along y."""
        ...

    @property
    def T(self) -> float:
        """Torsion."""
        ...

    @property
    def file(self) -> str:
        """Where the row stands."""
        ...

    @property
    def row(self) -> int:
        """Its number in the file."""
        ...


@dataclass(frozen=True)
class Bars:
    """Longitudinal bars; fields as in `BarsLike`."""

    count: int
    size: int
    n_x: int | None = None
    n_y: int | None = None


@dataclass(frozen=True)
class Ties:
    """Ties or a spiral; fields as in `TiesLike`."""

    kind: str
    size: int
    spacing: float


@dataclass(frozen=True)
class Column:
    """A column, with the schedule's defaults; fields as in `ColumnLike`."""

    mark: str
    b: float | None
    h: float
    bars: Bars
    ties: Ties
    cover: float
    f_c: float
    f_y: float
    f_yt: float | None = None
    aggregate: float | None = None
    l_u: float | None = None
    source: str = ""
    file: str = ""
    row: int = 0


@dataclass(frozen=True)
class Force:
    """Factored forces of one combination; fields as in `ForceLike`."""

    combination: str | None
    P: float
    Mx: float | None = 0.0
    My: float | None = 0.0
    Vx: float = 0.0
    Vy: float = 0.0
    T: float = 0.0
    file: str = ""
    row: int = 0


def row_of(column: ColumnLike) -> str:
    """Where the column's row stands: ``inputs/columns.csv, row 2``."""
    return position(column, f"column schedule, mark {column.mark}")


def section_source(column: ColumnLike) -> str:
    """Where the column's values come from: ``S-401, rev 2 (inputs/columns.csv, row 2)``."""
    return source_text(column.source, row_of(column))


def force_source(force: ForceLike, column: ColumnLike) -> str:
    """Where a force comes from: ``inputs/forces.csv, row 3``."""
    return position(force, f"member forces of {column.mark}")
