"""What the checks of bar anchorage read: one row of a schedule, and what is wrong with it."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Protocol

from calcpack.members.sources import position, source_text

__all__ = ["COATINGS", "KINDS", "Termination", "TerminationLike", "place", "row_of"]

KINDS = (
    "straight tension",
    "hook 90",
    "hook 180",
    "headed",
    "straight compression",
    "lap tension",
    "lap compression",
)
COATINGS = ("none", "epoxy", "zinc", "dual")


class TerminationLike(Protocol):
    """A place where a bar is developed or spliced, in coherent units."""

    @property
    def mark(self) -> str:
        """Name of the place."""
        ...

    @property
    def kind(self) -> str:
        """One of `KINDS`."""
        ...

    @property
    def bar(self) -> int:
        """Designation number."""
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
    def lamb(self) -> float:
        """Factor for lightweight concrete."""
        ...

    @property
    def top(self) -> bool:
        """More than 12 in of concrete is cast below the bar."""
        ...

    @property
    def coating(self) -> str:
        """None, epoxy, zinc or dual."""
        ...

    @property
    def c_b(self) -> float | None:
        """As the general equation takes it, in."""
        ...

    @property
    def clear_cover(self) -> float | None:
        """Of the bar, in."""
        ...

    @property
    def clear_spacing(self) -> float | None:
        """Of the bars developed, in."""
        ...

    @property
    def K_tr(self) -> float:
        """Transverse reinforcement index, in."""
        ...

    @property
    def side_cover(self) -> float | None:
        """Normal to the plane of the hook, in."""
        ...

    @property
    def tail_cover(self) -> float | None:
        """On the extension of a 90-degree hook, in."""
        ...

    @property
    def confining_ties(self) -> bool:
        """The tie condition of the provision is met."""
        ...

    @property
    def in_column_core(self) -> bool:
        """The hook or head ends inside a column core."""
        ...

    @property
    def A_s_required(self) -> float | None:
        """In^2; reduction for excess reinforcement, with `A_s_provided`."""
        ...

    @property
    def A_s_provided(self) -> float | None:
        """In^2."""
        ...

    @property
    def lap_class(self) -> str | None:
        """A or B."""
        ...

    @property
    def available(self) -> float | None:
        """Length the detail offers, in."""
        ...

    @property
    def spacing(self) -> float | None:
        """Centre to centre, in."""
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


@dataclass(frozen=True)
class Termination:
    """A place where a bar is developed or spliced, with the schedule's defaults; fields as in `TerminationLike`."""

    mark: str
    kind: str
    bar: int
    f_c: float
    f_y: float
    lamb: float = 1.0
    top: bool = False
    coating: str = "none"
    c_b: float | None = None
    clear_cover: float | None = None
    clear_spacing: float | None = None
    K_tr: float = 0.0
    side_cover: float | None = None
    tail_cover: float | None = None
    confining_ties: bool = False
    in_column_core: bool = False
    A_s_required: float | None = None
    A_s_provided: float | None = None
    lap_class: str | None = None
    available: float | None = None
    spacing: float | None = None
    source: str = ""
    file: str = ""
    row: int = 0


def row_of(row: TerminationLike) -> str:
    """Where the row stands: ``inputs/anchorage.csv, row 14``."""
    return position(row, f"schedule, mark {row.mark}")


def place(row: TerminationLike) -> str:
    """Where the row's values come from: ``S-301, detail 1, rev 2 (inputs/anchorage.csv, row 14)``."""
    return source_text(row.source, row_of(row))
