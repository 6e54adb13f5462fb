"""Key plan and elevation of a building, to scale: grid, columns, levels, storeys, footings."""

from __future__ import annotations

import math
from collections.abc import Collection, Mapping, Sequence
from itertools import pairwise
from typing import cast

from calcpack.figures.drawing import ACCENT, CENTRE, DIMENSION, GREY, INK, PAPER, TEXT, Drawing, Figure, Pen
from calcpack.figures.lettering import text_width
from calcpack.figures.trade import Refusal, feet_inches, scale_that_fits

__all__ = ["building_section", "framing_plan"]

Lines = Sequence[tuple[str, float]]
Places = tuple[int, int] | Sequence[tuple[int, int]]
_BUBBLE = 0.11


def framing_plan(
    *,
    grid_x: Lines,
    grid_y: Lines,
    columns: Mapping[str, Places],
    sizes: Mapping[str, tuple[float, float]] | None = None,
    emphasis: Collection[str] = (),
    edge: float = 0.0,
    north: float | None = None,
    title: str = "Key plan",
    scale: float = 0.0,
) -> Figure:
    """Key plan: grid lines with bubbles, bay dimensions, columns with their marks.

    Parameters
    ----------
    grid_x, grid_y : name and position of each grid line along x and along y, inches, in rising order
    columns : mark to the indices of its grid lines (along x, along y), or to several such pairs
    sizes : mark to its b and h in plan, inches; 18 in square by default
    emphasis : marks to point out
    edge : overhang of the slab beyond the outer grid lines, inches
    north : direction of north, degrees counter-clockwise from +x; no arrow by default
    title : caption
    scale : inches of the building in one inch of paper; by default the largest trade scale that fits

    Raises
    ------
    RangeError : fewer than two grid lines, lines out of order, or a column off the grid
    """
    places = {mark: _pairs(given) for mark, given in columns.items()}
    refusal = Refusal("the framing plan")
    _rising(refusal, "grid_x", grid_x)
    _rising(refusal, "grid_y", grid_y)
    refusal.unless(edge >= 0, f"edge = {edge:g} in", "0 in or more", "correct it")
    for mark, (b, h) in (sizes or {}).items():
        refusal.positive(**{f"b of {mark}": b, f"h of {mark}": h})
    refusal.unless(bool(places), "no columns", "one column at least", "give their marks and grid lines")
    for mark, pairs in places.items():
        for i, j in pairs:
            _on_grid(refusal, mark, i, j, len(grid_x), len(grid_y))
    for mark in sorted(set(emphasis) - set(places)):
        refusal.unless(False, f"emphasis on {mark}", f"a mark of {', '.join(places)}", "correct the mark")
    refusal.settle()
    (left, right), (low, high) = (grid_x[0][1], grid_x[-1][1]), (grid_y[0][1], grid_y[-1][1])
    drawing = Drawing(scale or scale_that_fits(right - left + 2 * edge, high - low + 2 * edge, 4.6, 3.2))
    drawing.rectangle(left - edge, low - edge, right + edge, high + edge, name="outline")
    _grid(drawing, grid_x, grid_y, edge)
    for mark, pairs in places.items():
        size = (sizes or {}).get(mark, (18.0, 18.0))
        for i, j in pairs:
            into = (-1 if i == len(grid_x) - 1 else 1, -1 if j == len(grid_y) - 1 else 1)
            _plan_column(drawing, mark, (grid_x[i][1], grid_y[j][1]), size, into, mark in emphasis)
    if north is not None:
        _north(drawing, (right + edge, high + edge), north)
    count = sum(len(pairs) for pairs in places.values())
    alt = (
        f"{title}, to scale: {len(grid_x)} grid lines along x from {grid_x[0][0]} to {grid_x[-1][0]}, "
        f"{feet_inches(right - left)} apart in all, {len(grid_y)} along y from {grid_y[0][0]} to {grid_y[-1][0]}, "
        f"{feet_inches(high - low)}; {count} columns: {', '.join(places)}."
    )
    return drawing.finish(title, alt)


def building_section(
    *,
    levels: Lines,
    grid: Lines,
    column_width: float = 18.0,
    slab_h: float = 10.0,
    footing_width: float = 84.0,
    footing_h: float = 24.0,
    ground: str = "",
    title: str = "Section",
    scale: float = 0.0,
) -> Figure:
    """Simple section through a building: columns on footings, slabs, level names and storey heights.

    Parameters
    ----------
    levels : name and elevation of each level, inches, rising; the first is the top of the footings
    grid : name and position of each column line, inches, rising
    column_width, slab_h : of the columns and the slabs seen, inches
    footing_width, footing_h : of the footings, inches
    ground : name of the level at which the ground is drawn; none by default
    title : caption
    scale : inches of the building in one inch of paper; by default the largest trade scale that fits

    Raises
    ------
    RangeError : fewer than two levels or lines, either out of order, or a size that is not positive
    """
    refusal = Refusal("the building section")
    refusal.positive(column_width=column_width, slab_h=slab_h, footing_width=footing_width, footing_h=footing_h)
    _rising(refusal, "levels", levels)
    _rising(refusal, "grid", grid)
    names = [name for name, _ in levels]
    refusal.unless(not ground or ground in names, f"ground = {ground}", f"a level: {', '.join(names)}", "correct it")
    refusal.settle()
    (left, right), (base, roof) = (grid[0][1], grid[-1][1]), (levels[0][1], levels[-1][1])
    half = max(footing_width, column_width) / 2
    drawing = Drawing(scale or scale_that_fits(right - left + 2 * half, roof - base + footing_h, 3.6, 3.4))
    for _, x in grid:
        drawing.rectangle(x - footing_width / 2, base - footing_h, x + footing_width / 2, base, name="footing")
        drawing.rectangle(x - column_width / 2, base, x + column_width / 2, roof, name="column")
    out = column_width / 2
    for _, level in levels[1:]:
        drawing.rectangle(left - out, level - slab_h, right + out, level, name="slab")
    _levels(drawing, levels, left - half, right + half, ground)
    for (_, lower), (_, upper) in pairwise(levels):
        drawing.dim_y(lower, upper, right + half, 0.3)
    for name, x in grid:
        _bubble(drawing, name, (x, roof), (0.0, 0.34))
    for (_, one), (_, other) in pairwise(grid):
        drawing.dim_x(one, other, base - footing_h, -0.22)
    heights = ", ".join(
        f"{upper_name} {feet_inches(upper - lower)} above {lower_name}"
        for (lower_name, lower), (upper_name, upper) in pairwise(levels)
    )
    lines = ", ".join(name for name, _ in grid)
    alt = f"{title}, to scale: column lines {lines}, {feet_inches(right - left)} apart in all; {heights}."
    return drawing.finish(title, alt)


def _pairs(given: Places) -> list[tuple[int, int]]:
    """The places of a mark as a list, also where only one was given."""
    if isinstance(given[0], int):
        return [cast("tuple[int, int]", tuple(given))]
    return [(i, j) for i, j in cast("Sequence[tuple[int, int]]", given)]


def _rising(refusal: Refusal, name: str, lines: Lines) -> None:
    refusal.unless(len(lines) >= 2, f"{name} has {len(lines)}", "two or more", "give name and position of each")
    for (one, lower), (other, upper) in pairwise(lines):
        rises = math.isfinite(lower) and math.isfinite(upper) and upper > lower
        refusal.unless(rises, f"{name}: {other} at {upper:g} in", f"above {one} at {lower:g} in", "put them in order")


def _on_grid(refusal: Refusal, mark: str, i: int, j: int, along_x: int, along_y: int) -> None:
    inside = 0 <= i < along_x and 0 <= j < along_y
    allowed = f"indices from (0, 0) to ({along_x - 1}, {along_y - 1})"
    refusal.unless(inside, f"column {mark} at ({i}, {j})", allowed, "correct its grid lines")


def _bubble(drawing: Drawing, name: str, at: tuple[float, float], offset: tuple[float, float]) -> None:
    """A grid bubble `offset` on paper from a point of the building, and its line up to it."""
    centre = drawing.paper(at, offset)
    length = math.hypot(*offset)
    foot = tuple(c - o / length * _BUBBLE for c, o in zip(centre, offset, strict=True))
    drawing.stroke(drawing.paper(at, (offset[0] * 0.15, offset[1] * 0.15)), (foot[0], foot[1]), pen=DIMENSION)
    world = (centre[0] * drawing.scale, centre[1] * drawing.scale)
    drawing.circle(world, 2 * _BUBBLE * drawing.scale, pen=Pen(0.5), fill=PAPER, name="bubble")
    drawing.text(name, at, (offset[0], offset[1] - 0.035), weight=600)


def _grid(drawing: Drawing, grid_x: Lines, grid_y: Lines, edge: float) -> None:
    left, right = grid_x[0][1] - edge, grid_x[-1][1] + edge
    low, high = grid_y[0][1] - edge, grid_y[-1][1] + edge
    for name, x in grid_x:
        drawing.line((x, low), (x, high), pen=CENTRE, name="grid")
        _bubble(drawing, name, (x, high), (0.0, 0.56))
    for name, y in grid_y:
        drawing.line((left, y), (right, y), pen=CENTRE, name="grid")
        _bubble(drawing, name, (left, y), (-0.56, 0.0))
    for (_, one), (_, other) in pairwise(grid_x):
        drawing.dim_x(one, other, high, 0.2)
    for (_, one), (_, other) in pairwise(grid_y):
        drawing.dim_y(one, other, left, -0.16)
    if len(grid_x) > 2:
        drawing.dim_x(grid_x[0][1], grid_x[-1][1], low, -0.2)
    if len(grid_y) > 2:
        drawing.dim_y(grid_y[0][1], grid_y[-1][1], right, 0.24)


def _plan_column(
    drawing: Drawing,
    mark: str,
    at: tuple[float, float],
    size: tuple[float, float],
    into: tuple[int, int],
    pointed: bool,
) -> None:
    """A column in plan, solid, its mark towards the inside of the plan; what is pointed out in the accent."""
    b, h = size
    (x, y), colour = at, ACCENT if pointed else INK
    corners = ((x - b / 2, y - h / 2), (x + b / 2, y - h / 2), (x + b / 2, y + h / 2), (x - b / 2, y + h / 2))
    drawing.outline(*corners, pen=Pen(0.35, colour), fill=colour, name="column")
    if pointed:
        drawing.circle(at, math.hypot(b, h) + 0.16 * drawing.scale, pen=Pen(0.7, colour), name="emphasis")
    gap = 0.09 if pointed else 0.04
    corner = (x + into[0] * b / 2, y + into[1] * h / 2)
    offset = (into[0] * gap, gap if into[1] > 0 else -gap - 0.075)
    weight, anchor = 600 if pointed else 400, "left" if into[0] > 0 else "right"
    drawing.text(mark, corner, offset, anchor=anchor, colour=colour, weight=weight)


def _north(drawing: Drawing, corner: tuple[float, float], direction: float) -> None:
    """A north arrow outside the top right corner of the plan."""
    angle = math.radians(direction)
    u, v = math.cos(angle), math.sin(angle)
    x, y = drawing.paper(corner, (0.55, 0.2))
    tip, tail = (x + 0.17 * u, y + 0.17 * v), (x - 0.17 * u, y - 0.17 * v)
    drawing.stroke(tail, tip, pen=Pen(0.5), name="north")
    wing = (tip[0] - 0.14 * u - 0.05 * v, tip[1] - 0.14 * v + 0.05 * u)
    drawing.stroke(tip, wing, (tip[0] - 0.1 * u, tip[1] - 0.1 * v), fill=INK)
    drawing.text("N", corner, (0.55 + 0.25 * u, 0.2 + 0.25 * v - 0.035), weight=600)


def _levels(drawing: Drawing, levels: Lines, left: float, right: float, ground: str) -> None:
    """Level lines with a mark, the name and the elevation at the left; the ground as a heavier line with hatching."""
    texts = [f"{name}\u00a0\u00a0{_elevation(level)}" for name, level in levels]
    reach = max(text_width(text, TEXT) for text in texts) + 0.2
    above = [*(level for _, level in levels[1:]), math.inf]
    for (name, level), text, upper in zip(levels, texts, above, strict=True):
        x, y = drawing.paper((left, level), (-0.08, 0.0))
        drawing.line((left, level), (right, level), pen=CENTRE, name="level")
        drawing.stroke((x - reach, y), (x, y))
        drawing.stroke((x, y), (x - 0.045, y + 0.075), (x + 0.045, y + 0.075), fill=INK)
        # Under its line where the next level leaves no room above it.
        rise = 0.035 if (upper - level) / drawing.scale > 0.17 else -0.105
        drawing.text(text, (left, level), (-0.08 - reach, rise), anchor="left")
        if name == ground:
            _ground(drawing, left, right, level)


def _elevation(level: float) -> str:
    return f"+{feet_inches(level)}" if level > 0 else feet_inches(level).replace("-", "−", 1) if level < 0 else "±0"


def _ground(drawing: Drawing, left: float, right: float, level: float) -> None:
    drawing.line((left, level), (right, level), pen=Pen(0.7), name="ground")
    start, end, y = left / drawing.scale, right / drawing.scale, level / drawing.scale
    for number in range(1, int((end - start) / 0.09)):
        x = start + 0.09 * number
        drawing.stroke((x, y), (x - 0.05, y - 0.05), pen=Pen(0.35, GREY))
