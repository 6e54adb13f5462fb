"""Axial force with bending about both axes: every listed combination against the design surface of the section.

The strength is that of the section alone; magnified moments of a slender column have to be in the table already.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator, Sequence
from typing import TYPE_CHECKING

from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.aci318.standards import ACI_318_14
from calcpack.members.column_section import ColumnLike, ForceLike
from calcpack.members.results import CheckResult, measured, verdict_of

if TYPE_CHECKING:
    from calcpack.mechanics import Section

__all__ = ["axial_and_bending", "bar_positions", "load_points"]

_CHECK, _CLAUSE = "axial and bending", "22.4"


def bar_positions(column: ColumnLike) -> list[tuple[float, float]]:
    """Centres of the longitudinal bars from the centre of the section, x along `b`, y along `h`, in."""
    inset = column.cover + bar(column.ties.size).d_b + bar(column.bars.size).d_b / 2
    if column.b is None or column.bars.n_x is None or column.bars.n_y is None:
        radius, step = column.h / 2 - inset, 2 * math.pi / column.bars.count
        return [(radius * math.cos(step * i), radius * math.sin(step * i)) for i in range(column.bars.count)]
    x, y = column.b / 2 - inset, column.h / 2 - inset
    along_x = [(at, side) for side in (-y, y) for at in _even(x, column.bars.n_x)]
    return along_x + [(side, at) for side in (-x, x) for at in _even(y, column.bars.n_y)[1:-1]]


def _even(reach: float, count: int) -> list[float]:
    return [reach * (2 * i / (count - 1) - 1) for i in range(count)]


def load_points(forces: Iterable[ForceLike]) -> Iterator[tuple[str, float, float, float]]:
    """Every factored load point as (combination, P, Mx, My); one for each end where moments are given by their ends."""
    for force in forces:
        if force.combination is not None:
            for Mx, My in zip(_ends(force, "Mx"), _ends(force, "My"), strict=True):
                yield force.combination, force.P, Mx, My


def _ends(force: ForceLike, name: str) -> tuple[float, float]:
    whole = getattr(force, name)
    if whole is not None:
        return whole, whole
    return getattr(force, f"{name}_bottom", None) or 0.0, getattr(force, f"{name}_top", None) or 0.0


def axial_and_bending(column: ColumnLike, forces: Sequence[ForceLike], edition: Edition) -> CheckResult:
    """Check every load point of a column; the result is that of the largest ratio along the ray from the origin.

    Raises
    ------
    RangeError : a section that cannot be, or a load that is no finite number
    """
    from calcpack.mechanics import Surface, rule_318_14, rule_318_19

    rule = rule_318_14 if edition.standard == ACI_318_14 else rule_318_19
    surface = Surface(_section(column), rule(f_y=column.f_y, spiral=column.ties.kind == "spiral"))
    values: dict[str, tuple[float | None, str]] = {
        "P_o": measured("P_o", surface.P_o),
        "phi_P_n_max": measured("phi_P_n_max", surface.phi_P_n_max),
    }
    points = list(load_points(forces))
    if not points:
        return CheckResult(column.mark, _CHECK, _CLAUSE, "", None, "", values)
    names, P, Mx, My = zip(*points, strict=True)
    checked = surface.check(P, Mx, My)
    worst = checked.governing
    ratio = float(checked.ratio[worst])
    moment = float(surface.moment_ratio(P[worst], Mx[worst], My[worst])[0])
    values["moment_ratio"] = (None if math.isnan(moment) else moment, "")
    values |= {"P_u": measured("P_u", P[worst]), "M_ux": measured("M_u", Mx[worst]), "M_uy": measured("M_u", My[worst])}
    return CheckResult(column.mark, _CHECK, _CLAUSE, names[worst], ratio, verdict_of(ratio), values)


def _section(column: ColumnLike) -> Section:
    from calcpack.mechanics import circle, rectangle

    one = bar(column.bars.size)
    bars = [(x, y, one.A_b) for x, y in bar_positions(column)]
    if column.b is None:
        return circle(column.h, bars, f_c=column.f_c, f_y=column.f_y, d_b=one.d_b)
    return rectangle(column.b, column.h, bars, f_c=column.f_c, f_y=column.f_y, d_b=one.d_b)
