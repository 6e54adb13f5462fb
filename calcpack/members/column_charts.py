"""Figures of a column's strength: the section with its neutral axis, and the load points against the design surface."""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

from calcpack.aci318.bars import bar
from calcpack.members.bar_layout import bar_positions
from calcpack.members.column_like import ColumnLike
from calcpack.members.interaction import Interaction, LoadPoint

if TYPE_CHECKING:
    from calcpack.figures import Figure

__all__ = ["draw_charts", "draw_section"]

_DIRECTIONS = 144


def draw_section(column: ColumnLike, theta: float, c: float, a: float) -> Figure:
    """The section to scale with its neutral axis and block: theta in rad, c and a in inches."""
    from calcpack.figures import neutral_axis_section

    d_b = bar(column.bars.size).d_b
    bars = [(x, y, d_b) for x, y in bar_positions(column)]
    tie_d = bar(column.ties.size).d_b
    return neutral_axis_section(
        b=column.b, h=column.h, cover=column.cover, tie_d=tie_d, bars=bars, theta=theta, c=c, a=a, mark=column.mark
    )


def draw_charts(checked: Interaction) -> Figure:
    """Axial force against moment in the plane of the governing load, and the moments at its axial force."""
    from calcpack.figures import side_by_side

    one = checked.governing
    assert one is not None
    plane = _plane(checked, one)
    least, most = checked.surface.axial_limits
    if not (least < one.P < most and (one.Mx or one.My)):
        return plane
    return side_by_side(plane, _contour(checked, one))


def _plane(checked: Interaction, one: LoadPoint) -> Figure:
    from calcpack.figures import interaction_diagram
    from calcpack.mechanics import NOMINAL, Surface

    Mx, My = (one.Mx, one.My) if one.Mx or one.My else (1.0, 0.0)
    P, M = checked.surface.meridian(Mx, My)
    P_nominal, M_nominal = Surface(checked.surface.section, NOMINAL).meridian(Mx, My)
    return interaction_diagram(
        P=P.tolist(),
        M=M.tolist(),
        P_nominal=P_nominal.tolist(),
        M_nominal=M_nominal.tolist(),
        loads=[(math.hypot(point.Mx, point.My), point.P) for point in checked.points],
        governing=(math.hypot(one.Mx, one.My), one.P, checked.ratio),
        cap=checked.surface.phi_P_n_max,
        mark=checked.column.mark,
        plane=_direction(one),
    )


def _direction(one: LoadPoint) -> str:
    if one.Mx == 0 or one.My == 0:
        return "" if one.Mx == one.My else f"M_{{{'x' if one.Mx else 'y'}}} alone"
    turned = math.degrees(math.atan2(one.My, one.Mx))
    return f"{turned:.1f}° from M_{{x}} to M_{{y}}".replace("-", "−")


def _contour(checked: Interaction, one: LoadPoint) -> Figure:
    from calcpack.figures import moment_contour

    angles = [2 * math.pi * step / _DIRECTIONS for step in range(_DIRECTIONS)]
    Mx, My = checked.surface.contour(one.P, angles)
    return moment_contour(
        Mx=Mx.tolist(),
        My=My.tolist(),
        loads=[(point.Mx, point.My, point.P) for point in checked.points],
        governing=(one.Mx, one.My),
        P=one.P,
        mark=checked.column.mark,
    )
