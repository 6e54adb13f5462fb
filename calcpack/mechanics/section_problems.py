"""What can be wrong with a section, found all at once."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING, Any

import numpy as np

from calcpack.errors import Problem
from calcpack.mechanics.outlines import (
    Floats,
    area_and_centroid,
    contains,
    crosses_itself,
    distance_to_edges,
    outlines_meet,
)

if TYPE_CHECKING:
    from calcpack.mechanics.section import Section

__all__ = ["section_problems"]

_F_C = (2_500.0, 20_000.0)
_F_Y = (40_000.0, 100_000.0)
# Bars that touch, and bars that touch the face, are drawn from rounded dimensions.
_TOUCH = 1e-9


def section_problems(section: Section) -> list[Problem]:
    """Every problem of a section: its numbers first; its geometry only where the numbers can be used."""
    problems = [*_material_problems(section), *_array_problems(section)]
    if problems:
        return problems
    problems = list(_shape_problems(section))
    return problems or [*_bars_outside(section), *_bars_overlapping(section)]


def _material_problems(section: Section) -> Iterator[Problem]:
    yield from _out_of_range("f_c", section.f_c, _F_C, "ACI 318 Table 19.2.1.1; above, no test supports the block")
    yield from _out_of_range("f_y", section.f_y, _F_Y, "ASTM A615 and ACI 318-19 Table 20.2.2.4a")
    for name, value in (("E_s", section.E_s), ("eps_cu", section.eps_cu)):
        if not 0 < value < np.inf:
            yield Problem(f"{name} = {value:g}", "a positive number", "correct the value")


def _out_of_range(name: str, value: float, limits: tuple[float, float], source: str) -> Iterator[Problem]:
    low, high = limits
    if low <= value <= high:
        return
    meant = next((value * factor for factor in (1000, 100, 0.001) if low <= value * factor <= high), None)
    remedy = "correct the value" if meant is None else f"was this meant to be {meant:,.0f} psi?"
    yield Problem(f"{name} = {value:,g} psi", f"allowed {low:,.0f} to {high:,.0f} psi ({source})", remedy)


def _array_problems(section: Section) -> Iterator[Problem]:
    if (section.outline is None) == (section.diameter is None):
        yield Problem("outline and diameter", "one of them", "give a polygon its outline, a circle its diameter")
    if section.diameter is not None and not 0 < section.diameter < np.inf:
        yield Problem(f"diameter = {section.diameter:g} in", "a positive length", "correct the value")
    if section.diameter is not None and section.openings:
        yield Problem("openings in a circle", "a solid circle", "give the outline as a polygon")
    for name, loop in _loops(section):
        if loop.ndim != 2 or loop.shape[1] != 2 or len(loop) < 3 or not np.isfinite(loop).all():
            given = f"{name}, shape {loop.shape}"
            yield Problem(given, "3 or more vertices (x, y), finite numbers", "list the vertices")
    yield from _bar_array_problems(section)


def _bar_array_problems(section: Section) -> Iterator[Problem]:
    bars, d_b = section.bars, section.d_b
    if bars.ndim != 2 or bars.shape[1] != 3 or not len(bars) or not np.isfinite(bars).all():
        yield Problem(f"bars, shape {bars.shape}", "1 or more rows x, y, area, finite numbers", "list the bars")
        return
    for number in np.flatnonzero(bars[:, 2] <= 0):
        area = bars[number, 2]
        yield Problem(f"{_bar(section, number)}, area {area:g} in²", "a positive area", "correct the area")
    if d_b is None:
        return
    if d_b.shape != (len(bars),):
        yield Problem(f"d_b of {d_b.size} bars", f"one diameter a bar, {len(bars)}", "list a diameter for each bar")
        return
    for number in np.flatnonzero(~((d_b > 0) & (d_b < np.inf))):
        given = f"{_bar(section, number)}, d_b = {d_b[number]:g} in"
        yield Problem(given, "a positive diameter", "correct the diameter")


def _loops(section: Section) -> list[tuple[str, Floats]]:
    outline = [] if section.outline is None else [("outline", section.outline)]
    return outline + [(f"opening {number}", loop) for number, loop in enumerate(section.openings, 1)]


def _shape_problems(section: Section) -> Iterator[Problem]:
    loops = _loops(section)
    for name, loop in loops:
        if crosses_itself(loop):
            yield Problem(name, "sides that meet only at their ends", "list the vertices in order around the outline")
        elif area_and_centroid(loop)[0] == 0:
            yield Problem(name, "a polygon with an area", "list the vertices in order around the outline")
    for index, (name, loop) in enumerate(loops):
        for other_name, other in loops[index + 1 :]:
            apart = not outlines_meet(loop, other) and contains(loop, other[:1])[0] == (name == "outline")
            nested = name != "outline" and contains(other, loop[:1])[0]
            if not apart or nested:
                yield Problem(f"{other_name} and {name}", "openings inside the outline, clear of each other", "move it")


def _bars_outside(section: Section) -> Iterator[Problem]:
    for number in np.flatnonzero(_clearance(section) < -_TOUCH):
        whole = "the whole bar inside the concrete" if section.d_b is not None else "inside the concrete"
        yield Problem(_bar(section, number), whole, "check the position and the cover")


def _clearance(section: Section) -> Floats:
    """From the surface of each bar to the nearest face, negative where it passes the face."""
    points = section.bars[:, :2]
    radius = np.full(len(points), 2 * _TOUCH) if section.d_b is None else section.d_b / 2
    if section.diameter is not None:
        clear: Floats = section.diameter / 2 - np.hypot(points[:, 0], points[:, 1]) - radius
        return clear
    clear = np.full(len(points), np.inf)
    for name, loop in _loops(section):
        inside = contains(loop, points) == (name == "outline")
        clear = np.minimum(clear, np.where(inside, 1, -1) * distance_to_edges(loop, points))
    return clear - radius


def _bars_overlapping(section: Section) -> Iterator[Problem]:
    points = section.bars[:, :2]
    radius = np.zeros(len(points)) if section.d_b is None else section.d_b / 2
    first, second = np.triu_indices(len(points), 1)
    apart = np.linalg.norm(points[first] - points[second], axis=-1)
    for index in np.flatnonzero(apart < np.maximum(radius[first] + radius[second] - _TOUCH, _TOUCH)):
        given = f"{_bar(section, first[index])} and {_bar(section, second[index])}, {apart[index]:.3g} in apart"
        yield Problem(given, "bars that do not overlap", "check the positions and the number of bars")


def _bar(section: Section, number: np.signedinteger[Any]) -> str:
    x, y, _ = section.bars[number]
    return f"bar {number + 1} at ({x:g}, {y:g}) in"
