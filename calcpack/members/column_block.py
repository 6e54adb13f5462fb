"""The stress block of a column at a neutral axis, worked on a pad: its area, its centroid, its force."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from math import cos, sin
from typing import TypeVar

from calcpack.aci318 import stress_block
from calcpack.formula import Formula
from calcpack.members.column_like import ColumnLike
from calcpack.members.column_rules import ColumnWorking
from calcpack.tabulation import Above, Column, Row, Tabulation, Worked

__all__ = ["Axes", "NeutralAxis", "bending_axes", "step", "work_block"]

T = TypeVar("T")
_PARALLEL = 1e-6


@dataclass(frozen=True)
class NeutralAxis:
    """Direction of the compressed face, rad counterclockwise from +x, and depth, in."""

    theta: float
    c: float

    def fits(self, axes: Axes) -> bool:
        """Whether it is parallel to the axis about which alone a load bends.

        It need not be: a row of bars on the edge of the block, some inside and some not, turns it.
        """
        off = {"x": cos(self.theta), "y": sin(self.theta), "": 0.0}[axes.name]
        return abs(off) < _PARALLEL


@dataclass(frozen=True)
class Axes:
    """About which axes a load bends: ``x`` alone, ``y`` alone, or both, where `name` is empty."""

    name: str
    circular: bool

    @property
    def levers(self) -> str:
        """The coordinates that count: y for bending about x."""
        return {"x": "y", "y": "x", "": "xy"}[self.name]


def bending_axes(column: ColumnLike, M_ux: float, M_uy: float) -> Axes:
    """Bending is about one axis alone where the other moment is zero and the bars are symmetric about the plane."""
    circular = column.b is None
    symmetric = not circular or column.bars.count % 2 == 0
    if M_uy == 0 and M_ux != 0 and symmetric:
        return Axes("x", circular)
    return Axes("y" if M_ux == 0 and M_uy != 0 else "", circular)


def step(work: ColumnWorking[T], v: dict[str, T], formula: Formula) -> T:
    """Work a formula from the values so far, and keep its result among them."""
    v[formula.result_name] = made = work.pad.work(formula, **{name: v[name] for name in formula.arguments})
    return made


def work_block(work: ColumnWorking[T], v: dict[str, T], axes: Axes) -> None:
    """Work direction, depth, area, centroid and force of the block; `v` holds c, and theta where bending is skew."""
    steps: list[Formula] = [stress_block.block_depth]
    if axes.name == "":
        fibre = stress_block.extreme_fibre_circular if axes.circular else stress_block.extreme_fibre_rectangular
        steps += [stress_block.direction_x, stress_block.direction_y, fibre]
    else:
        side = stress_block.side_y if axes.name == "x" else stress_block.side_x
        fibre = stress_block.extreme_fibre_x if axes.name == "x" else stress_block.extreme_fibre_y
        steps += [side, stress_block.extreme_fibre_circular if axes.circular else fibre]
    for formula in steps:
        step(work, v, formula)
    if axes.circular:
        _segment(work, v, axes)
    elif axes.name == "x":
        _all(work, v, stress_block.area_x, stress_block.centroid_y)
    elif axes.name == "y":
        _all(work, v, stress_block.area_y, stress_block.centroid_x)
    else:
        _polygon(work, v)
    step(work, v, stress_block.concrete_force)


def _all(work: ColumnWorking[T], v: dict[str, T], *formulas: Formula) -> None:
    for formula in formulas:
        step(work, v, formula)


def _segment(work: ColumnWorking[T], v: dict[str, T], axes: Axes) -> None:
    _all(work, v, stress_block.arc_half_angle, stress_block.area_circular, stress_block.centroid_segment)
    if "x" in axes.levers:
        step(work, v, stress_block.centroid_x_segment)
    if "y" in axes.levers:
        step(work, v, stress_block.centroid_y_segment)


def _polygon(work: ColumnWorking[T], v: dict[str, T]) -> None:
    step(work, v, stress_block.block_edge)
    rows = _vertex_rows(work, v)
    table = work.pad.tabulate(_VERTICES, rows, v)
    v |= table.totals
    _all(work, v, stress_block.area_polygon, stress_block.centroid_x_polygon, stress_block.centroid_y_polygon)


_VERTICES = Tabulation(
    title="Vertices of the block, counterclockwise",
    label="vertex",
    formulas=(stress_block.cross_product, stress_block.moment_of_vertex_x, stress_block.moment_of_vertex_y),
    columns=(Column("x", 4), Column("y", 4), Column("A_j", 2), Column("S_jx", 1), Column("S_jy", 1)),
    totals={"A_j": "A_j_sum", "S_jx": "S_jx_sum", "S_jy": "S_jy_sum"},
)
_CORNERS = ((-1, -1), (1, -1), (1, 1), (-1, 1))
_HALF = {1: "0.5*", -1: "-0.5*"}


def _vertex_rows(work: ColumnWorking[T], v: dict[str, T]) -> list[Row[T]]:
    """The corners beyond the edge of the block, and where the edge crosses a side; the first again at the end."""
    u_x, u_y, q, b, h = (work.pad.number(v[name]) for name in ("u_x", "u_y", "q", "b", "h"))
    found: list[dict[str, Worked[T]]] = []
    for number, (i, j) in enumerate(_CORNERS):
        k, m = _CORNERS[(number + 1) % 4]
        here, there = (u_x * s * b / 2 + u_y * t * h / 2 - q for s, t in ((i, j), (k, m)))
        if here > 0:
            found.append(_point(v, f"{_HALF[i]}b", f"{_HALF[j]}h"))
        if (here > 0) != (there > 0):
            crossing = _on_side(i, "") if i == k else _on_side(0, _HALF[j])
            found.append(_point(v, *crossing))
    return _closed(found)


def _on_side(i: int, level: str) -> tuple[str, str]:
    """Where the edge crosses the side at x = i b/2, or, where i is 0, the side at y = `level` h."""
    if i:
        x = f"{_HALF[i]}b"
        return x, f"(q - u_x*({x}))/u_y"
    y = f"{level}h"
    return f"(q - u_y*({y}))/u_x", y


def _point(v: dict[str, T], x: str, y: str) -> dict[str, Worked[T]]:
    names = ("q", "u_x", "u_y", "b", "h")
    return {
        symbol: Worked(text, {name: v[name] for name in names if _uses(text, name)})
        for symbol, text in zip("xy", (x, y), strict=True)
    }


def _uses(text: str, name: str) -> bool:
    return name in text.replace("(", " ").replace(")", " ").replace("*", " ").replace("/", " ").split()


def _closed(found: Sequence[dict[str, Worked[T]]]) -> list[Row[T]]:
    before = {"x_before": Above("x"), "y_before": Above("y")}
    rows: list[Row[T]] = [(str(number), dict(point)) for number, point in enumerate(found, 1)]
    closing: list[Row[T]] = [("1", dict(found[0]))]
    return [rows[0], *((label, {**own, **before}) for label, own in [*rows[1:], *closing])]
