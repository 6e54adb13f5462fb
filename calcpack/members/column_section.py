"""What the checks of columns read: one row of the column schedule and its forces, and where its bars stand."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Protocol

from calcpack.aci318 import columns
from calcpack.aci318.bars import bar

__all__ = [
    "Bars",
    "BarsLike",
    "Column",
    "ColumnLike",
    "Face",
    "Force",
    "ForceLike",
    "Ties",
    "TiesLike",
    "bar_faces",
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


@dataclass(frozen=True)
class Face:
    """Bars along one face, or around a circle: their number and clear spacing."""

    name: str
    n_face: int
    s_clear: float


def bar_faces(column: ColumnLike) -> list[Face]:
    """The faces of a rectangular column, or the circle of a circular one, with the clear spacing of their bars."""
    d_b, d_bt = bar(column.bars.size).d_b, bar(column.ties.size).d_b
    if column.b is None or column.bars.n_x is None or column.bars.n_y is None:
        D_s = columns.bar_circle(h=column.h, c_cover=column.cover, d_bt=d_bt, d_b=d_b)
        return [
            Face(
                "circle",
                column.bars.count,
                columns.bar_spacing_circular.function(D_s=D_s, n_bars=column.bars.count, d_b=d_b),
            )
        ]
    sides = (("along x", column.b, column.bars.n_x), ("along y", column.h, column.bars.n_y))
    return [
        Face(name, n, columns.bar_spacing_face(b=width, c_cover=column.cover, d_bt=d_bt, n_face=n, d_b=d_b))
        for name, width, n in sides
    ]


def section_source(column: ColumnLike) -> str:
    """Where the column is scheduled, as a source."""
    if not column.file:
        return f"column schedule, mark {column.mark}"
    return f"{column.file}, row {column.row}" if column.row else column.file
