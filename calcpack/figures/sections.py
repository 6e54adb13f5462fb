"""Cross sections of columns, to scale: outline, ties or spiral, bars, dimensions and callouts."""

from __future__ import annotations

import math
from collections.abc import Sequence

from calcpack.figures.bars import Bar
from calcpack.figures.drawing import CENTRE, INK, PALE, SMALL, SOFT, Drawing, Figure, Pen, Point, arc
from calcpack.figures.trade import Refusal, feet_inches, scale_that_fits

__all__ = ["bar_inside", "column_section_circular", "column_section_rectangular"]

_PAPER = 2.4


def column_section_rectangular(
    *,
    b: float,
    h: float,
    cover: float,
    tie_d: float,
    bars: Sequence[tuple[float, float, float]],
    bar_label: str,
    tie_label: str,
    mark: str = "",
    scale: float = 0.0,
) -> Figure:
    """Section of a rectangular tied column.

    Parameters
    ----------
    b, h : sides along x and y, inches
    cover : clear, to the tie, inches
    tie_d : diameter of the tie, inches
    bars : centre x, y from the centre of the section, and diameter, inches; see `rectangular_bars`
    bar_label, tie_label : callouts, e.g. ``8-#9`` and ``#3 ties @ 12 in``
    mark : the column's mark, for caption and alternative text
    scale : inches of the column in one inch of paper; by default the largest trade scale that fits 2.4 in

    Raises
    ------
    RangeError : a length that is not positive, or a bar outside the ties
    """
    refusal = Refusal("the column section")
    refusal.positive(b=b, h=h, cover=cover, tie_d=tie_d)
    refusal.unless(bool(bars), "no bars", "one bar at least", "give the bars of the schedule")
    inset = cover + tie_d
    for x, y, d_b in bars:
        inside = abs(x) + d_b / 2 <= b / 2 - inset + 1e-6 and abs(y) + d_b / 2 <= h / 2 - inset + 1e-6
        bar_inside(refusal, Bar(x, y, d_b), inside)
    refusal.settle()
    drawing = Drawing(scale or scale_that_fits(b, h, _PAPER, _PAPER))
    drawing.rectangle(-b / 2, -h / 2, b / 2, h / 2, name="outline")
    _axes(drawing, b, h)
    _tie(drawing, b, h, cover, tie_d, max(bar[2] for bar in bars))
    placed = _bars(drawing, bars)
    drawing.dim_x(-b / 2, b / 2, -h / 2, -0.24)
    drawing.dim_y(-h / 2, h / 2, -b / 2, -0.24)
    drawing.dim_x(b / 2 - cover, b / 2, h / 2, 0.17, f"{feet_inches(cover)} clr")
    _callouts(drawing, placed, (b / 2 - cover - tie_d / 2, _between(placed, h)), b / 2, bar_label, tie_label)
    name = f"column {mark}" if mark else "a column"
    alt = (
        f"Section of {name} to scale: {feet_inches(b)} wide along x by {feet_inches(h)} deep along y, {len(bars)} bars "
        f"({bar_label}) inside {tie_label}, clear cover {feet_inches(cover)} to the tie."
    )
    return drawing.finish(f"Section of {name}, {feet_inches(b)} x {feet_inches(h)}, {bar_label}", alt)


def column_section_circular(
    *,
    h: float,
    cover: float,
    spiral_d: float,
    bars: Sequence[tuple[float, float, float]],
    bar_label: str,
    spiral_label: str,
    mark: str = "",
    scale: float = 0.0,
) -> Figure:
    """Section of a circular column with a spiral or circular ties.

    Parameters
    ----------
    h : diameter, inches
    cover : clear, to the spiral, inches
    spiral_d : diameter of the spiral bar, inches
    bars : centre x, y from the centre of the section, and diameter, inches; see `circular_bars`
    bar_label, spiral_label : callouts, e.g. ``10-#8`` and ``#4 spiral @ 2 1/4 in``
    mark : the column's mark, for caption and alternative text
    scale : inches of the column in one inch of paper; by default the largest trade scale that fits 2.4 in

    Raises
    ------
    RangeError : a length that is not positive, or a bar outside the spiral
    """
    refusal = Refusal("the column section")
    refusal.positive(h=h, cover=cover, spiral_d=spiral_d)
    refusal.unless(bool(bars), "no bars", "one bar at least", "give the bars of the schedule")
    inside = h / 2 - cover - spiral_d
    for x, y, d_b in bars:
        bar_inside(refusal, Bar(x, y, d_b), math.hypot(x, y) + d_b / 2 <= inside + 1e-6)
    refusal.settle()
    drawing = Drawing(scale or scale_that_fits(h, h, _PAPER, _PAPER))
    drawing.circle((0, 0), h, fill=PALE, name="outline")
    _axes(drawing, h, h)
    tie = Pen(max(spiral_d / drawing.scale * 72, 0.7), SOFT)
    drawing.circle((0, 0), h - 2 * cover - spiral_d, pen=tie, name="tie")
    placed = _bars(drawing, bars)
    drawing.dim_x(-h / 2, h / 2, -h / 2, -0.24, f"{feet_inches(h)} dia.")
    # The extension lines start where outline and spiral are lowest and run out to the left.
    drawing.dim_y(-h / 2, -h / 2 + cover, -h / 20, -(9 * h / 20 / drawing.scale + 0.12), f"{feet_inches(cover)} clr")
    angle = math.radians(-30)
    reach = inside + spiral_d / 2
    _callouts(drawing, placed, (reach * math.cos(angle), reach * math.sin(angle)), h / 2, bar_label, spiral_label)
    name = f"column {mark}" if mark else "a column"
    alt = (
        f"Section of {name} to scale: circular, {feet_inches(h)} in diameter, {len(bars)} bars ({bar_label}) on a "
        f"circle inside {spiral_label}, clear cover {feet_inches(cover)} to the spiral."
    )
    return drawing.finish(f"Section of {name}, {feet_inches(h)} dia., {bar_label}", alt)


def bar_inside(refusal: Refusal, bar: Bar, inside: bool) -> None:
    """Note a problem where a bar has no diameter or is not `inside` the tie."""
    refusal.positive(d_b=bar.d_b)
    given = f"bar of {bar.d_b:g} in at x = {bar.x:g} in, y = {bar.y:g} in"
    refusal.unless(inside, given, "the whole bar inside the tie, clear cover kept", "check size, cover and layout")


def _axes(drawing: Drawing, b: float, h: float) -> None:
    past = 0.12 * drawing.scale
    drawing.line((-b / 2 - past / 2, 0), (b / 2 + past, 0), pen=CENTRE, name="axis")
    drawing.line((0, -h / 2 - past / 2), (0, h / 2 + past), pen=CENTRE, name="axis")
    drawing.text("x", (b / 2 + past, 0), (0.05, -0.03), anchor="left", size=SMALL, colour=SOFT)
    drawing.text("y", (0, h / 2 + past), (0, 0.04), size=SMALL, colour=SOFT)


def _bars(drawing: Drawing, bars: Sequence[tuple[float, float, float]]) -> list[Bar]:
    for x, y, d_b in bars:
        drawing.circle((x, y), d_b, pen=Pen(0), fill=INK, name="bar")
    return [Bar(*bar) for bar in bars]


def _tie(drawing: Drawing, b: float, h: float, cover: float, tie_d: float, d_b: float) -> None:
    """The tie round the bars, its ends hooked 135 degrees about the top left bar and run 6 diameters into the core."""
    x, y = b / 2 - cover - tie_d / 2, h / 2 - cover - tie_d / 2
    radius = (d_b + tie_d) / 2
    tail = max(6 * tie_d, 3.0)
    turn = (-x + radius, y - radius)
    run = (tail * math.cos(math.radians(-45)), tail * math.sin(math.radians(-45)))
    first, last = arc(turn, radius, 225, 90), arc(turn, radius, 180, 45)
    path: list[Point] = [_moved(first[0], run), *first]
    for corner, start in (
        ((x - radius, y - radius), 90),
        ((x - radius, radius - y), 0),
        ((radius - x, radius - y), -90),
    ):
        path += arc(corner, radius, start, start - 90)
    path += [*last, _moved(last[-1], run)]
    drawing.bar(path, tie_d, colour=SOFT, name="tie")


def _moved(point: Point, by: Point) -> Point:
    return point[0] + by[0], point[1] + by[1]


def _between(bars: Sequence[Bar], h: float) -> float:
    """A level on the lower right leg of the tie that no bar covers."""
    right = max(bar.x for bar in bars)
    levels = sorted(bar.y for bar in bars if bar.x > right - 1e-6 and bar.y <= 1e-6)
    return (levels[0] + levels[1]) / 2 if len(levels) > 1 else -h / 5


def _callouts(drawing: Drawing, bars: list[Bar], tie: Point, edge: float, bar_label: str, tie_label: str) -> None:
    upper = [bar for bar in bars if bar.y > 1e-6] or bars
    target = max(upper, key=lambda bar: (round(bar.x, 6), bar.y))
    column = edge / drawing.scale + 0.24
    tip = (target.x + 0.35 * target.d_b, target.y - 0.1 * target.d_b)
    # Both keep clear of the x at the end of the axis, also beside a shallow section.
    for point, drop, clear, label in ((tip, -0.12, 0.14, bar_label), (tie, -0.1, -0.14, tie_label)):
        x, y = drawing.paper(point)
        level = max(y + drop, clear) if clear > 0 else min(y + drop, clear)
        drawing.leader(point, (column - x, level - y), label)
