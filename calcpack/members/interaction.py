"""Axial force with bending about both axes: every load point of a column against the design surface of its section."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import TYPE_CHECKING

from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.aci318.standards import ACI_318_14
from calcpack.members.bar_layout import bar_positions
from calcpack.members.column_like import ColumnLike, ForceLike
from calcpack.members.results import CheckResult, measured, verdict_of

if TYPE_CHECKING:
    from calcpack.mechanics import Checked, Section, Surface

__all__ = ["CHECK", "CLAUSE", "Interaction", "LoadPoint", "end_points", "section_of"]

CHECK, CLAUSE = "axial and bending", "22.4"


@dataclass(frozen=True, slots=True)
class LoadPoint:
    """A load on the section, lb and lb*in.

    Attributes
    ----------
    force : number of the force it comes from, among those of the column
    place : which of the points of that force
    name : its combination
    """

    force: int
    place: int
    name: str
    P: float
    Mx: float
    My: float


def end_points(forces: Iterable[ForceLike]) -> Iterator[LoadPoint]:
    """The load points of a column whose section alone is checked: both ends, or one where moments are given once."""
    for number, force in enumerate(forces):
        name = force.combination or ""
        if force.Mx is not None and force.My is not None:
            yield LoadPoint(number, 0, name, force.P, force.Mx, force.My)
            continue
        x = (force.Mx_bottom or 0.0, force.Mx_top or 0.0) if force.Mx is None else (force.Mx, force.Mx)
        y = (force.My_bottom or 0.0, force.My_top or 0.0) if force.My is None else (force.My, force.My)
        for place in (0, 1):
            yield LoadPoint(number, place, name, force.P, x[place], y[place])


@dataclass(frozen=True)
class Interaction:
    """The load points of one column against its design surface.

    Raises
    ------
    RangeError : a section that cannot be, or a load that is no finite number
    """

    column: ColumnLike
    edition: Edition
    points: Sequence[LoadPoint]

    @cached_property
    def surface(self) -> Surface:
        """The design surface."""
        from calcpack.mechanics import Surface, rule_318_14, rule_318_19

        rule = rule_318_14 if self.edition.standard == ACI_318_14 else rule_318_19
        spiral = self.column.ties.kind == "spiral"
        return Surface(section_of(self.column), rule(f_y=self.column.f_y, spiral=spiral))

    @cached_property
    def checked(self) -> Checked:
        """Every load point against the surface."""
        points = self.points
        return self.surface.check([one.P for one in points], [one.Mx for one in points], [one.My for one in points])

    @cached_property
    def governing(self) -> LoadPoint | None:
        """The point of the largest ratio; None where there is no load."""
        return self.points[self.checked.governing] if self.points else None

    @property
    def ratio(self) -> float:
        """The largest ratio."""
        return float(self.checked.ratio[self.checked.governing])

    @property
    def capped(self) -> bool:
        """Whether the maximum axial strength governs the largest ratio, and not a neutral axis."""
        return bool(self.checked.capped[self.checked.governing])

    @property
    def neutral_axis(self) -> tuple[float, float]:
        """Direction and depth of the neutral axis of the largest ratio."""
        worst = self.checked.governing
        return float(self.checked.theta[worst]), float(self.checked.c[worst])

    def result(self) -> CheckResult:
        """The check of the largest ratio; without loads, the strengths alone."""
        surface, one = self.surface, self.governing
        values: dict[str, tuple[float | None, str]] = {
            "P_o": measured("P_o", surface.P_o),
            "phi_P_n_max": measured("phi_P_n_max", surface.phi_P_n_max),
        }
        if one is None:
            return CheckResult(self.column.mark, CHECK, CLAUSE, "", None, "", values)
        moment = float(surface.moment_ratio(one.P, one.Mx, one.My)[0])
        values["moment_ratio"] = (None if math.isnan(moment) else moment, "")
        values |= {"P_u": measured("P_u", one.P), "M_ux": measured("M_u", one.Mx), "M_uy": measured("M_u", one.My)}
        return CheckResult(self.column.mark, CHECK, CLAUSE, one.name, self.ratio, verdict_of(self.ratio), values)


def section_of(column: ColumnLike) -> Section:
    """The section of a column; its bars as points, since bars that touch are told by the check of their spacing."""
    from calcpack.mechanics import circle, rectangle

    bars = [(x, y, bar(column.bars.size).A_b) for x, y in bar_positions(column)]
    if column.b is None:
        return circle(column.h, bars, f_c=column.f_c, f_y=column.f_y)
    return rectangle(column.b, column.h, bars, f_c=column.f_c, f_y=column.f_y)
