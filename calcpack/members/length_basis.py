"""What a development and lap schedule is for, and what its lengths hold for."""

from __future__ import annotations

from dataclasses import dataclass

from calcpack.aci318.bars import BARS, bar

__all__ = ["Basis", "EndConditions", "Extent", "Strengths"]


@dataclass(frozen=True)
class Extent:
    """A cover or spacing: in inches, or in bar diameters."""

    value: float
    in_diameters: bool = False

    def of(self, size: int) -> float:
        """In inches, for a bar size.

        >>> Extent(2.0, in_diameters=True).of(9)
        2.256
        """
        return self.value * bar(size).d_b if self.in_diameters else self.value

    def __str__(self) -> str:
        if not self.in_diameters:
            return f"{self.value:g} in"
        return "d_b" if self.value == 1 else f"{self.value:g} d_b"


@dataclass(frozen=True)
class EndConditions:
    """What hooks, or heads, may count on; each as the column of anchorage.csv, `ties` as `confining_ties`."""

    side_cover: Extent | None = None
    tail_cover: Extent | None = None
    ties: bool = False
    in_column_core: bool = False


@dataclass(frozen=True)
class Basis:
    """What the lengths of a schedule hold for.

    Attributes
    ----------
    increment : lengths are rounded up to a multiple of it, in
    general : straight bars by the general equation with K_tr = 0, else by the table
    clear_cover, clear_spacing : the least that bars in tension have; both or neither
    hooks, heads : conditions of hooked and of headed bars
    confined : bars in compression are developed inside a spiral or close ties
    lap_ties : compression laps stand in column ties that permit the reduction
    sizes : bar sizes, in order
    source : where these are stated
    """

    increment: float = 1.0
    general: bool = False
    clear_cover: Extent | None = None
    clear_spacing: Extent | None = None
    hooks: EndConditions = EndConditions()
    heads: EndConditions = EndConditions()
    confined: bool = False
    lap_ties: bool = False
    sizes: tuple[int, ...] = tuple(BARS)
    source: str = "default of the schedule"


@dataclass(frozen=True)
class Strengths:
    """What one table of the schedule is for; psi. `source` names where the strengths are stated."""

    f_c: float
    f_y: float
    coating: str = "none"
    lamb: float = 1.0
    source: str = "default of the schedule"
