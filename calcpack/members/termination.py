"""What the checks of bar anchorage read: one row of a schedule, and what is wrong with it."""

from __future__ import annotations

from dataclasses import dataclass, fields
from typing import Any, Protocol

from calcpack.aci318.bars import bar
from calcpack.aci318.bundles import equivalent_diameter
from calcpack.members.sources import position, source_text

__all__ = [
    "COATINGS",
    "EXCLUSIONS",
    "KINDS",
    "Termination",
    "TerminationLike",
    "diameter_of_bundle",
    "place",
    "row_of",
    "termination_of",
]

KINDS = (
    "straight tension",
    "hook 90",
    "hook 180",
    "headed",
    "straight compression",
    "lap tension",
    "lap compression",
    "mechanical splice",
)
COATINGS = ("none", "epoxy", "zinc", "dual")
EXCLUSIONS = ("noncontinuous support", "f_y required", "continuous bars", "seismic")


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
    def bundle(self) -> int:
        """Bars in the bundle, 1 for a bar by itself."""
        ...

    @property
    def spliced(self) -> float | None:
        """Share of the bars spliced within the lap length."""
        ...

    @property
    def other_bar(self) -> int | None:
        """Designation number of the bar it is lapped with, where that is of another size."""
        ...

    @property
    def bar_stress(self) -> float | None:
        """Of column bars at the splice: tensile stress under factored loads over f_y."""
        ...

    @property
    def spiral(self) -> bool:
        """The bar lies inside a column's spiral."""
        ...

    @property
    def M_n(self) -> float | None:
        """At a simple support or inflection, all bars stressed to f_y, lb*in."""
        ...

    @property
    def V_u(self) -> float | None:
        """There, lb."""
        ...

    @property
    def l_a(self) -> float | None:
        """Embedment past the centre of support or the inflection, in."""
        ...

    @property
    def confined_reaction(self) -> bool:
        """A compressive reaction confines the ends of the bars."""
        ...

    @property
    def joint(self) -> str:
        """Special, in the joint of a special moment frame; empty elsewhere."""
        ...

    @property
    def excess_exclusion(self) -> str:
        """One of `EXCLUSIONS` that rules out the reduction for excess reinforcement, or empty."""
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
    bundle: int = 1
    spliced: float | None = None
    other_bar: int | None = None
    bar_stress: float | None = None
    spiral: bool = False
    M_n: float | None = None
    V_u: float | None = None
    l_a: float | None = None
    confined_reaction: bool = False
    joint: str = ""
    excess_exclusion: str = ""
    source: str = ""
    file: str = ""
    row: int = 0


def termination_of(row: TerminationLike, **changes: Any) -> Termination:
    """A row with some of its values changed, for what is worked beside the row itself."""
    values = {field.name: getattr(row, field.name) for field in fields(Termination)}
    return Termination(**{**values, **changes})


def diameter_of_bundle(row: TerminationLike) -> float:
    """The diameter that counts for cover, spacing and confinement: of the bar, or of one bar of the bundle's area."""
    one = bar(row.bar)
    return one.d_b if row.bundle == 1 else equivalent_diameter(A_b=one.A_b, n_bundle=float(row.bundle))


def row_of(row: TerminationLike) -> str:
    """Where the row stands: ``inputs/anchorage.csv, row 14``."""
    return position(row, f"schedule, mark {row.mark}")


def place(row: TerminationLike) -> str:
    """Where the row's values come from: ``S-301, detail 1, rev 2 (inputs/anchorage.csv, row 14)``."""
    return source_text(row.source, row_of(row))
