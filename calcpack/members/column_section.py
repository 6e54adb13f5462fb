"""What the checks of columns read: one row of the column schedule, its forces and its story."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from calcpack.members.column_like import BarsLike, ColumnLike, ForceLike, StoryLike, TiesLike
from calcpack.members.sources import position, source_text

__all__ = [
    "Bars",
    "BarsLike",
    "Column",
    "ColumnLike",
    "Force",
    "ForceLike",
    "Story",
    "StoryLike",
    "Sway",
    "Term",
    "Ties",
    "TiesLike",
    "force_source",
    "row_of",
    "section_source",
]


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
    k_x: float | None = None
    k_y: float | None = None
    frame: str | None = None
    lamb: float = 1.0
    psi_x_bottom: float | None = None
    psi_x_top: float | None = None
    psi_y_bottom: float | None = None
    psi_y_top: float | None = None
    beta_dns: float | None = None
    delta_s: float | None = None
    story: str = ""
    seismic: str = "none"
    legs_x: int = 2
    legs_y: int = 2
    legs_stated: bool = False
    ties_beyond: Ties | None = None
    group: str = ""
    source: str = ""
    file: str = ""
    row: int = 0


@dataclass(frozen=True)
class Sway:
    """The part of factored moments that wind and earthquake cause, at both ends, lb*in."""

    Mx_bottom: float = 0.0
    Mx_top: float = 0.0
    My_bottom: float = 0.0
    My_top: float = 0.0


@dataclass(frozen=True)
class Term:
    """A load and its factor in a combination; `row` is the unfactored row of the force table."""

    factor: float
    load: str
    row: Any


@dataclass(frozen=True)
class Force:
    """Factored forces of one combination; fields as in `ForceLike`.

    Attributes
    ----------
    terms : how the combination was formed; empty where the table gives factored forces
    P_sustained : factored sustained axial force, where the combination was formed
    sway : what wind and earthquake contribute to the moments, where the combination was formed
    """

    combination: str | None
    P: float
    Mx: float | None = 0.0
    My: float | None = 0.0
    Mx_bottom: float | None = None
    Mx_top: float | None = None
    My_bottom: float | None = None
    My_top: float | None = None
    terms: tuple[Term, ...] = ()
    P_sustained: float | None = None
    sway: Sway | None = None
    Vx: float = 0.0
    Vy: float = 0.0
    T: float = 0.0
    file: str = ""
    row: int = 0


@dataclass(frozen=True)
class Story:
    """A story of a sway frame; fields as in `StoryLike`."""

    story: str
    sum_P_u: float
    V_us: float
    Delta_o: float
    l_c: float
    sum_P_c: float | None = None
    combination: str = ""
    source: str = ""
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
