"""A column section with its neutral axis and compression block, to scale, the bars numbered."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass, field, replace
from itertools import combinations, pairwise

from calcpack.figures.bars import Bar
from calcpack.figures.clearing import Box, Obstacles, broken, centred
from calcpack.figures.drawing import (
    BAR,
    CENTRE,
    DIMENSION,
    GREY,
    INK,
    PALE,
    PAPER,
    SMALL,
    SOFT,
    TEXT,
    Drawing,
    Figure,
    Label,
    Pen,
    Point,
    arc,
)
from calcpack.figures.lettering import text_width
from calcpack.figures.numerals import numbered
from calcpack.figures.outline import Outline, dot
from calcpack.figures.sections import bar_inside
from calcpack.figures.trade import Refusal, feet_inches, scale_that_fits

__all__ = ["neutral_axis_section"]

# Of the section; of one whose bars would stand too close for their numerals; and how close that is.
_PAPER, _LARGER, _CLOSE = 2.0, 2.6, 0.2
_HATCH, _HATCHED = 0.07, Pen(0.35, GREY)
_AXIS = Pen(0.7, INK, (14, 3, 2, 3))
# Where the dimension lines run beside the section, and what lettering keeps from a line.
_ASIDE, _CLEAR = 0.2, 0.045


def neutral_axis_section(
    *,
    b: float | None,
    h: float,
    cover: float,
    tie_d: float,
    bars: Sequence[tuple[float, float, float]],
    theta: float,
    c: float,
    a: float,
    mark: str = "",
    scale: float = 0.0,
) -> Figure:
    """Section of a column at its strength: compression block hatched, neutral axis, bars numbered in the order given.

    Bars on the compressed side of the neutral axis are filled, the others open.

    Parameters
    ----------
    b, h : sides along x and y, inches; `b` of None makes it a circle of diameter `h`
    cover : clear, to the tie or spiral, inches
    tie_d : diameter of the tie or spiral, inches
    bars : centre x, y from the centre of the section, and diameter, inches
    theta : direction from the centre towards the compressed face, counterclockwise from +x, rad; any where `c` is 0 or
        infinite
    c : depth of the neutral axis from the extreme compression fibre, square to the axis, inches; 0 where no concrete
        is compressed, infinite under uniform compression
    a : depth of the compression block, likewise, inches
    mark : the column's mark, for caption and alternative text
    scale : inches of the column in one inch of paper; by default the largest trade scale that fits 2 in,
        or 2.6 in where the bars are close

    Raises
    ------
    RangeError : a length that is not positive, a bar outside the tie, or a block deeper than its neutral axis
    """
    refusal = Refusal("the section with its neutral axis")
    width = h if b is None else b
    refusal.positive(**({} if b is None else {"b": b}), h=h, cover=cover, tie_d=tie_d)
    refusal.unless(bool(bars), "no bars", "one bar at least", "give the bars of the schedule")
    inner = Outline(width / 2 - cover - tie_d, h / 2 - cover - tie_d, b is None)
    for x, y, d_b in bars:
        bar_inside(refusal, Bar(x, y, d_b), inner.holds((x, y), d_b / 2))
    _block_holds(refusal, theta, c, a)
    refusal.settle()
    drawing = Drawing(scale or _scale(width, h, bars))
    outline = Outline(width / 2 / drawing.scale, h / 2 / drawing.scale, b is None)
    turned = theta if 0 < c < math.inf else 0.0
    view = _View(drawing, outline, turned, c / drawing.scale, a / drawing.scale)
    view.draw([Bar(*bar) for bar in bars], cover, tie_d)
    _note(drawing, _beyond(view, c))
    size = f"{feet_inches(h)} dia." if b is None else f"{feet_inches(b)} x {feet_inches(h)}"
    name = f"column {mark}" if mark else "a column"
    alt = f"Section of {name}, {size}, to scale, {len(bars)} bars: {_told(view, bars, turned, c, a)}"
    caption = f"Neutral axis and compression block of {name}, {size}; bars in compression filled"
    return drawing.finish(caption, alt)


@dataclass
class _View:
    """The section on paper, inches, its centre at the origin, seen along `theta`; `c` and `a` are paper inches too."""

    drawing: Drawing
    outline: Outline
    theta: float
    c: float
    a: float
    over: Obstacles = field(default_factory=Obstacles)

    def __post_init__(self) -> None:
        x, y = (round(part, 12) for part in (math.cos(self.theta), math.sin(self.theta)))
        self.up: Point = (x, y)
        # The block is lettered on the right of the section, or above it.
        self.side: Point = (y, -x) if (y, -x) > (0.0, 0.0) else (-y, x)
        self.top = self.outline.reach(self.up)
        self.depth = 2 * self.top

    @property
    def other_side(self) -> Point:
        """Across from where the block is lettered."""
        return -self.side[0], -self.side[1]

    def compressed(self, centre: Point) -> bool:
        """Whether a point on paper lies on the compressed side of the neutral axis."""
        return self.top - dot(centre, self.up) < self.c

    def at(self, level: float, aside: float, side: Point) -> Point:
        """The point at a level along `theta` and a distance to one side, both from the centre."""
        return self.up[0] * level + side[0] * aside, self.up[1] * level + side[1] * aside

    def draw(self, bars: Sequence[Bar], cover: float, tie_d: float) -> None:
        """Everything, from the block below to the lettering on top."""
        scale = self.drawing.scale
        placed = [(self.drawing.paper((bar.x, bar.y)), bar.d_b / 2 / scale) for bar in bars]
        tie = self._tie((cover + tie_d / 2) / scale, (max(bar.d_b for bar in bars) + tie_d) / 2 / scale)
        self.over.discs += placed
        for path in (tie, self._rim()):
            self.over.path(path)
        for level in (self.top - self.c, self.top - self.a):
            self.over.breakable += pairwise(self._across(level))
        self.over.within = (-self.outline.x, -self.outline.y, self.outline.x, self.outline.y)
        self.drawing.labels += numbered(placed, self.over, circular=self.outline.round)
        self.over.within, numerals = None, list(self.over.boxes)
        self._block(numerals)
        self._centre_lines(numerals)
        # Grey, so that open and filled bars are told apart beside it.
        pen = Pen(max(tie_d / scale * 72, BAR.weight), GREY)
        self.drawing.outline(*((x * scale, y * scale) for x, y in tie[:-1]), pen=pen, fill="", name="tie")
        for centre, radius in placed:
            self._bar(centre, radius)
        self._outline()
        asides = self._dimensions(numerals) if 0 < self.a < self.depth else []
        self._lettered_axes()
        if asides:
            self._names(asides)

    def _across(self, level: float) -> list[Point]:
        """The line square to `theta` at a level, inside the section; no points where it misses."""
        found = self.outline.chord(self.at(level, 0.0, self.side), self.side) if math.isfinite(level) else None
        return [self.at(level, end, self.side) for end in found] if found else []

    def _rim(self) -> list[Point]:
        """The outline as a line."""
        if self.outline.round:
            return arc((0.0, 0.0), self.outline.x, 0.0, 360.0)
        return [*self.outline.corners, self.outline.corners[0]]

    def _tie(self, inset: float, radius: float) -> list[Point]:
        """The centreline of the tie, its corners bent about the bars."""
        x, y = self.outline.x - inset, self.outline.y - inset
        if self.outline.round:
            return arc((0.0, 0.0), x, 0.0, 360.0)
        turns = ((x - radius, y - radius, 0), (radius - x, y - radius, 90), (radius - x, radius - y, 180))
        corners = [arc((i, j), radius, start, start + 90) for i, j, start in (*turns, (x - radius, radius - y, 270))]
        return [*(point for corner in corners for point in corner), corners[0][0]]

    def _block(self, numerals: Sequence[Box]) -> None:
        """The compression block and its hatching."""
        if not self.a:
            return
        part = self.outline.beyond(self.up, self.top - min(self.a, self.depth))
        self.drawing.stroke(*part, pen=Pen(0), fill=PALE, name="block")
        for start, end in self._hatching():
            for piece in broken(start, end, numerals):
                self.drawing.stroke(*piece, pen=_HATCHED, name="hatch")

    def _hatching(self) -> Iterator[tuple[Point, Point]]:
        """Lines at 45 degrees inside the block, those that meet its edge at the larger angle."""
        half, level = math.sqrt(0.5), self.top - min(self.a, self.depth)
        along = max(((half, half), (-half, half)), key=lambda way: round(abs(dot(way, self.up)), 9))
        count = math.ceil(math.hypot(self.outline.x, self.outline.y) / _HATCH)
        for number in range(-count, count + 1):
            foot = (-along[1] * number * _HATCH, along[0] * number * _HATCH)
            found, slope = self.outline.chord(foot, along), dot(along, self.up)
            if found and abs(slope) > 1e-9:
                limit = (level - dot(foot, self.up)) / slope
                near, far = (max(found[0], limit), found[1]) if slope > 0 else (found[0], min(found[1], limit))
                if near < far:
                    yield _stepped(foot, along, near), _stepped(foot, along, far)

    def _centre_lines(self, numerals: Sequence[Box]) -> None:
        x, y = self.outline.x, self.outline.y
        for start, end in (((-x - 0.06, 0.0), (x + 0.12, 0.0)), ((0.0, -y - 0.06), (0.0, y + 0.12))):
            # Lettering keeps off the ends; inside the section the lines are broken at the numerals.
            self.over.path([start, (max(start[0], -x), max(start[1], -y))])
            self.over.path([(min(end[0], x), min(end[1], y)), end])
            for piece in broken(start, end, numerals):
                self.drawing.stroke(*piece, pen=CENTRE, name="axis")

    def _bar(self, centre: Point, radius: float) -> None:
        x, y = (part * self.drawing.scale for part in centre)
        # The line of an open bar lies inside its size.
        inner = 2 * (radius - BAR.weight / 144) * self.drawing.scale
        fill = INK if self.compressed(centre) else PAPER
        self.drawing.circle((x, y), inner, pen=BAR, fill=fill, name="bar")

    def _outline(self) -> None:
        x, y = self.outline.x * self.drawing.scale, self.outline.y * self.drawing.scale
        if self.outline.round:
            self.drawing.circle((0.0, 0.0), 2 * x, name="outline")
        else:
            self.drawing.rectangle(-x, -y, x, y, fill="", name="outline")

    def _dimensions(self, numerals: Sequence[Box]) -> list[float]:
        """Edge of the block, and the dimension lines of a and, where the axis is seen, of c: how far out they stand."""
        edge, level = self.top - self.a, self.top - self.c
        start, end = self._across(edge)
        for piece in broken(start, end, numerals):
            self.drawing.stroke(*piece, pen=BAR, name="edge")
        asides = [self._dimension(edge, self.side)]
        if self.c < self.depth:
            asides.append(self._dimension(level, self.other_side, meets_axis=True))
            self.over.path([self._axis_start(asides[1]), _stepped(self._axis_exit(), self.side, 0.1)])
        return asides

    def _axis_start(self, aside: float) -> Point:
        """Where the neutral axis starts: past the line of its dimension."""
        return self.at(self.top - self.c, aside + 0.05, self.other_side)

    def _axis_exit(self) -> Point:
        """Where the neutral axis leaves the section on the side of its name."""
        return max(self._across(self.top - self.c), key=lambda end: dot(end, self.side))

    def _names(self, asides: Sequence[float]) -> None:
        """The neutral axis to its name, and the texts of the dimensions."""
        if len(asides) > 1:
            written = list(self.over.boxes)
            for piece in broken(self._axis_start(asides[1]), self._named_end(), written):
                self.drawing.stroke(*piece, pen=_AXIS, name="neutral axis")
            self._write(f"c = {self.c * self.drawing.scale:.2f} in", self.top - self.c, asides[1], self.other_side)
        self._write(f"block, a = {self.a * self.drawing.scale:.2f} in", self.top - self.a, asides[0], self.side)

    def _named_end(self) -> Point:
        """Write the name of the neutral axis past the section, and return where the axis ends before it."""
        ends = [_stepped(self._axis_exit(), self.side, 0.1 * step) for step in range(1, 16)]
        labels = [_past("neutral axis", end, self.side) for end in ends]
        best = self.over.place(labels)
        self.drawing.labels.append(best)
        self.over.path([self._axis_exit(), ends[labels.index(best)]])
        return ends[labels.index(best)]

    def _dimension(self, level: float, side: Point, *, meets_axis: bool = False) -> float:
        """The line of a dimension from the extreme compression fibre to a level, square to the neutral axis.

        Returns how far from the centre it stands, clear of what it spans.
        """
        away = max(dot(point, side) for point in self.outline.beyond(self.up, level)) + _ASIDE
        starts = [(self.top, dot(self.outline.extreme(self.up, side), side))]
        if not meets_axis:
            starts.append((level, max(dot(end, side) for end in self._across(level))))
        for height, start in starts:
            self._thin(self.at(height, start + 0.04, side), self.at(height, away + 0.05, side))
        ends = self.at(self.top, away, side), self.at(level, away, side)
        self._thin(*ends, name="dimension")
        slant = ((self.up[0] + side[0]) * 0.028, (self.up[1] + side[1]) * 0.028)
        for end in ends:
            self._thin(_stepped(end, slant, -1.0), _stepped(end, slant, 1.0), pen=BAR)
        return away

    def _write(self, text: str, level: float, away: float, side: Point) -> None:
        """The text of a dimension beside its line, shifted towards the compressed face as far as it takes."""
        # As in other figures, text along an upright dimension is read from the right where it fits.
        turn = 90 if not self.up[0] and text_width(text, TEXT) + 0.1 <= self.top - level else 0
        beside = _past(text, self.at((self.top + level) / 2, away, side), side, turn)
        places = (replace(beside, at=_stepped(beside.at, self.up, 0.04 * number)) for number in range(60))
        self.drawing.labels.append(self.over.place(places))

    def _thin(self, start: Point, end: Point, name: str = "", pen: Pen = DIMENSION) -> None:
        self.drawing.stroke(start, end, pen=pen, name=name)
        self.over.path([start, end])

    def _lettered_axes(self) -> None:
        """The names of the two centre lines, where they stand clear."""
        for text, along, across, out in (("x", (1, 0), (0, 1), self.outline.x), ("y", (0, 1), (1, 0), self.outline.y)):
            places = [_stepped((0.0, 0.0), along, out + 0.18)]
            # At the end of the line, then beside it, then further off.
            for past in (0.08, 0.14, 0.2, 0.26, 0.32, 0.38, 0.44):
                places += [
                    _stepped(_stepped((0.0, 0.0), along, out + past), across, off) for off in (0.06, -0.06, 0.14, -0.14)
                ]
            best = self.over.place(centred(text, place, SMALL) for place in places)
            self.drawing.text(text, (0.0, 0.0), best.at, size=SMALL, colour=SOFT)


def _stepped(point: Point, along: Point, by: float) -> Point:
    return point[0] + along[0] * by, point[1] + along[1] * by


def _past(text: str, beside: Point, side: Point, turn: int = 0) -> Label:
    """Lettering beside a point, wholly on one side of it."""
    along, across = text_width(text, TEXT) / 2, 0.36 * TEXT / 72
    x, y = (across, along) if turn else (along, across)
    return centred(text, _stepped(beside, side, _CLEAR + abs(side[0]) * x + abs(side[1]) * y), TEXT, turn)


def _scale(width: float, h: float, bars: Sequence[tuple[float, float, float]]) -> float:
    """The scale of the drawing: with bars close to each other a larger one."""
    usual = scale_that_fits(width, h, _PAPER, _PAPER)
    apart = min((math.dist(one[:2], other[:2]) for one, other in combinations(bars, 2)), default=math.inf)
    return usual if apart >= _CLOSE * usual else scale_that_fits(width, h, _LARGER, _LARGER)


def _block_holds(refusal: Refusal, theta: float, c: float, a: float) -> None:
    refusal.unless(c >= 0, f"c = {c:g} in", "a depth of 0 in or more", "correct it")
    refusal.unless(0 <= a <= c, f"a = {a:g} in", f"from 0 in to c = {c:g} in", "give the depth of the block")
    needed = 0 < c < math.inf
    refusal.unless(math.isfinite(theta) or not needed, f"theta = {theta:g}", "a direction in rad", "give it")


def _beyond(view: _View, c: float) -> str:
    """What cannot be drawn, in words."""
    if view.a == 0:
        return "no concrete in compression"
    if math.isinf(c):
        return "uniform compression, block over the whole section"
    if view.a >= view.depth:
        return f"neutral axis outside, c = {c:.2f} in; block over the whole section"
    return f"neutral axis outside the section, c = {c:.2f} in" if view.c >= view.depth else ""


def _note(drawing: Drawing, text: str) -> None:
    from calcpack.figures.rendering import bounds

    if text:
        left, bottom, _, _ = bounds(drawing.strokes, drawing.labels)
        drawing.labels.append(Label(text, (left, bottom - 0.15), "left"))


def _told(view: _View, bars: Sequence[tuple[float, float, float]], theta: float, c: float, a: float) -> str:
    pressed = [n for n, bar in enumerate(bars, 1) if view.compressed(view.drawing.paper(bar[:2]))]
    pulled = [n for n in range(1, len(bars) + 1) if n not in pressed]
    states = [
        f"{_listed(group)} in {state}" for group, state in ((pressed, "compression"), (pulled, "tension")) if group
    ]
    where = _beyond(view, c) or f"c = {c:.2f} in and a = {a:.2f} in from the extreme compression fibre"
    if 0 < a < math.inf:
        where += f", compressed face at {math.degrees(theta) % 360:.1f} degrees counterclockwise from x"
    return f"{where}; bars {', '.join(states)}."


def _listed(numbers: Sequence[int]) -> str:
    """Numbers in rising order, three or more in a row as a range: ``1 to 4, 9``."""
    runs: list[list[int]] = []
    for number in numbers:
        if runs and number == runs[-1][-1] + 1:
            runs[-1].append(number)
        else:
            runs.append([number])
    parts = (f"{run[0]} to {run[-1]}" if len(run) > 2 else ", ".join(map(str, run)) for run in runs)
    return ", ".join(parts)
