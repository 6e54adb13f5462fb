"""Axial force with bending of one column: the governing load point, worked so that a hand can verify it."""

from __future__ import annotations

from collections.abc import Sequence
from math import isnan
from typing import TypeVar

from calcpack.members.column_axial import AXIAL_STEPS
from calcpack.members.column_bending import work_ray, work_strength, work_tension
from calcpack.members.column_block import Axes, NeutralAxis, bending_axes
from calcpack.members.column_charts import draw_charts, draw_section
from calcpack.members.column_like import ForceLike, StoryLike
from calcpack.members.column_reciprocal import work_reciprocal
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_slenderness import Point, Slenderness, story_of
from calcpack.members.interaction import CLAUSE, Interaction
from calcpack.members.results import CheckResult

__all__ = ["bending_check"]

T = TypeVar("T")
_WHAT = "axial force with bending, on the ray through the load"
_CONVENTIONS = (
    "Plane sections; block of 0.85 f_c; bars elastic to f_y; a bar displaces concrete where its centre lies inside the "
    "block. Moments act about the centroid of the gross section: positive M_ux compresses the face at +y, positive "
    "M_uy that at +x. The ratio is taken on the ray from the origin through the load; phi follows the extreme tension "
    "bar, measured square to the neutral axis."
)

_NO_FORCES = "No factored forces listed for this column: the strengths alone are stated."
_BUCKLED = "No magnifier exists in any combination, see stability: there is no load to hold against the section."


def bending_check(
    work: ColumnWorking[T],
    checked: Interaction,
    slender: Slenderness[T],
    forces: Sequence[ForceLike],
    stories: Sequence[StoryLike],
    evidence: bool,
) -> CheckResult:
    """The largest ratio of all load points; with `evidence` it is worked on the pad.

    Parameters
    ----------
    checked : every load point in bulk
    slender : gives the governing load point on the pad, with second-order effects
    forces : the factored forces that the points were made from
    """
    result = checked.result()
    if not evidence:
        return result
    work.pad.heading("Axial force with bending")
    one = checked.governing
    if one is None:
        work.pad.reason(_BUCKLED if forces else _NO_FORCES)
        return result
    work.pad.reason(_CONVENTIONS)
    # A single moment stands at both ends, which are one load point.
    points = {(point.force, point.P, point.Mx, point.My) for point in checked.points}
    work.pad.reason(_why(one.name, len(points), len(forces)))
    force = forces[one.force]
    point = slender.magnified(force, story_of(work.column, force, stories)).points[one.place]
    _show(work, checked, point)
    return result


def _why(name: str, points: int, forces: int) -> str:
    if forces == 1:
        return f"Governing: {name}, the only combination listed."
    of = f"{forces} combinations" if points == forces else f"{points} load points of {forces} combinations"
    return f"Governing: {name}, the largest ratio of {of}."


def _show(work: ColumnWorking[T], checked: Interaction, point: Point[T]) -> None:
    """Work the governing point by what governs it: the maximum axial strength, tension alone, or a neutral axis."""
    P, Mx, My = (work.pad.number(value) for value in (point.P, point.Mx, point.My))
    if checked.capped:
        work.pad.reason("On this ray the maximum axial strength governs; no neutral axis is needed.")
        *_, capacity = [work.value(symbol) for symbol in AXIAL_STEPS]
        work.verify(_WHAT, point.P, capacity, CLAUSE)
        work.pad.figure(lambda: draw_charts(checked))
    elif (Mx or My) and not isnan(checked.neutral_axis[0]):
        _show_neutral_axis(work, checked, point)
    elif P < 0:
        work_tension(work, point.P, _WHAT)
    else:
        work.pad.reason("No force acts on the section.")


def _show_neutral_axis(work: ColumnWorking[T], checked: Interaction, point: Point[T]) -> None:
    number = work.pad.number
    axes = bending_axes(work.column, number(point.Mx), number(point.My))
    axis = NeutralAxis(*checked.neutral_axis)
    if not axis.fits(axes):
        axes = Axes("", axes.circular)
    acting = {"x": {"M_ux": point.Mx}, "y": {"M_uy": point.My}, "": {"M_ux": point.Mx, "M_uy": point.My}}
    strength = work_strength(work, axis, axes, {"P_u": point.P, **acting[axes.name]})
    a = number(strength.values["a"])
    work.pad.figure(lambda: draw_section(work.column, axis.theta, axis.c, a))
    work_ray(work, strength, _WHAT, CLAUSE)
    work.pad.figure(lambda: draw_charts(checked))
    work_reciprocal(work, checked, strength)
