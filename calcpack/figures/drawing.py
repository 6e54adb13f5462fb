"""A drawing to scale: strokes and labels in the building's inches, collected, then rendered once as SVG."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, field

from calcpack.figures.lettering import text_width
from calcpack.figures.trade import feet_inches, scale_note

__all__ = [
    "ACCENT",
    "BAR",
    "CENTRE",
    "DIMENSION",
    "GREY",
    "HIDDEN",
    "INK",
    "OUTLINE",
    "PALE",
    "PAPER",
    "SMALL",
    "SOFT",
    "TEXT",
    "Drawing",
    "Figure",
    "Label",
    "Pen",
    "Point",
    "Stroke",
    "arc",
]

Point = tuple[float, float]

INK, SOFT, GREY, PALE, PAPER, ACCENT = "#1b1b1b", "#5c5c5c", "#8a8a8a", "#f0f0f0", "#ffffff", "#234f8c"
TEXT, SMALL = 7.5, 7.0


@dataclass(frozen=True)
class Figure:
    """A finished figure.

    Attributes
    ----------
    svg : the drawing, deterministic, text as text
    caption : what stands under it
    alt : a sentence that says what is drawn, with its numbers
    width, height : size on paper, inches
    """

    svg: str
    caption: str
    alt: str
    width: float
    height: float

    def _repr_svg_(self) -> str:
        return self.svg


@dataclass(frozen=True)
class Pen:
    """A line weight in points, its colour and dashes (in line widths)."""

    weight: float
    colour: str = INK
    dashes: tuple[float, ...] = ()


OUTLINE = Pen(0.9)
BAR = Pen(0.7)
DIMENSION = Pen(0.35)
THIN = Pen(0.35, GREY)
HIDDEN = Pen(0.5, SOFT, (6, 3))
CENTRE = Pen(0.35, GREY, (16, 4, 3, 4))


@dataclass(frozen=True)
class Stroke:
    """A line, polygon or circle in paper inches; `radius` above zero makes it a circle about its one point."""

    points: tuple[Point, ...]
    pen: Pen
    fill: str = ""
    closed: bool = False
    radius: float = 0.0
    name: str = ""


@dataclass(frozen=True)
class Label:
    """Text at a baseline point in paper inches; ``_{d}`` sets a subscript. `turn` is 0 or 90 degrees."""

    text: str
    at: Point
    anchor: str = "center"
    size: float = TEXT
    colour: str = INK
    weight: int = 400
    turn: int = 0

    @property
    def box(self) -> tuple[float, float, float, float]:
        """Left, bottom, right, top of the text on paper, inches."""
        width, (x, y) = text_width(self.text, self.size, self.weight), self.at
        back = {"left": 0.0, "center": width / 2, "right": width}[self.anchor]
        rise, fall = 0.72 * self.size / 72, 0.2 * self.size / 72
        if self.turn:
            return x - rise, y - back, x + fall, y - back + width
        return x - back, y - fall, x - back + width, y + rise


def arc(centre: Point, radius: float, start: float, end: float) -> list[Point]:
    """Points on an arc from angle `start` to `end`, degrees counter-clockwise from +x, no more than 5 degrees apart."""
    steps = max(2, math.ceil(abs(end - start) / 5))
    angles = (math.radians(start + (end - start) * i / steps) for i in range(steps + 1))
    return [(centre[0] + radius * math.cos(a), centre[1] + radius * math.sin(a)) for a in angles]


@dataclass
class Drawing:
    """Collects what is drawn. World coordinates are inches of the building; offsets are inches of paper.

    Attributes
    ----------
    scale : inches of the building in one inch of paper
    """

    scale: float
    strokes: list[Stroke] = field(default_factory=list)
    labels: list[Label] = field(default_factory=list)

    def paper(self, point: Point, offset: Point = (0.0, 0.0)) -> Point:
        """Where a point of the building lies on paper."""
        return point[0] / self.scale + offset[0], point[1] / self.scale + offset[1]

    def line(self, *points: Point, pen: Pen = OUTLINE, name: str = "") -> None:
        """An open line through points of the building."""
        self.strokes.append(Stroke(tuple(map(self.paper, points)), pen, name=name))

    def outline(self, *points: Point, pen: Pen = OUTLINE, fill: str = PALE, name: str = "") -> None:
        """A closed, filled shape."""
        self.strokes.append(Stroke(tuple(map(self.paper, points)), pen, fill, closed=True, name=name))

    def area(self, points: Sequence[Point], fill: str = PALE) -> None:
        """A fill without an outline."""
        self.strokes.append(Stroke(tuple(map(self.paper, points)), Pen(0), fill, closed=True))

    def rectangle(self, left: float, bottom: float, right: float, top: float, *, fill: str = PALE, name: str) -> None:
        """A closed rectangle, sides along x and y."""
        self.outline((left, bottom), (right, bottom), (right, top), (left, top), fill=fill, name=name)

    def circle(self, centre: Point, diameter: float, *, pen: Pen = OUTLINE, fill: str = "", name: str = "") -> None:
        """A circle to scale."""
        self.strokes.append(Stroke((self.paper(centre),), pen, fill, True, diameter / 2 / self.scale, name))

    def bar(self, points: Sequence[Point], d_b: float, *, colour: str = INK, name: str = "bar") -> None:
        """A bar along its centreline, as thick as its diameter is at this scale, 0.7 pt at least."""
        self.line(*points, pen=Pen(max(d_b / self.scale * 72, BAR.weight), colour), name=name)

    def text(
        self,
        text: str,
        at: Point,
        offset: Point = (0.0, 0.0),
        *,
        anchor: str = "center",
        size: float = TEXT,
        colour: str = INK,
        weight: int = 400,
    ) -> None:
        """A label at a point of the building, moved by `offset` on paper."""
        self.labels.append(Label(text, self.paper(at, offset), anchor, size, colour, weight))

    def stroke(self, *points: Point, pen: Pen = DIMENSION, fill: str = "", name: str = "") -> None:
        """A line given on paper: dimension lines, leaders, marks that have no size in the building."""
        self.strokes.append(Stroke(points, pen, fill, bool(fill), name=name))

    def dim_x(self, x1: float, x2: float, y: float, off: float, text: str = "", side: str = "right") -> None:
        """A horizontal dimension between `x1` and `x2`, `off` above (or below) the level `y`.

        Text that does not go between the ticks stands on the `side` named.
        """
        left, right = self.paper((min(x1, x2), y)), self.paper((max(x1, x2), y))
        level, away = left[1] + off, math.copysign(1, off)
        text = text or feet_inches(abs(x2 - x1))
        width, place, ends = self._placed(text, left[0], right[0], side)
        for x in (left[0], right[0]):
            self.stroke((x, left[1] + 0.04 * away), (x, level + 0.05 * away))
            self._tick((x, level))
        self.stroke((ends[0], level), (ends[1], level), name="dimension")
        rise = 0.03 if width else -0.035
        self.labels.append(Label(text, (place, level + rise), "center"))

    def dim_y(self, y1: float, y2: float, x: float, off: float, text: str = "") -> float:
        """A vertical dimension between `y1` and `y2`, `off` right (or left) of `x`, its text read from the right.

        Text that does not go between the ticks stands level beside the line. Returns the `off` at which a further
        dimension on the same side clears this one.
        """
        low, high = self.paper((x, min(y1, y2))), self.paper((x, max(y1, y2)))
        level, away = low[0] + off, math.copysign(1, off)
        text = text or feet_inches(abs(y2 - y1))
        fits, place, ends = self._placed(text, low[1], high[1], "right")
        for y in (low[1], high[1]):
            self.stroke((low[0] + 0.04 * away, y), (level + 0.05 * away, y))
            self._tick((level, y))
        if fits:
            self.stroke((level, ends[0]), (level, ends[1]), name="dimension")
            self.labels.append(Label(text, (level - 0.03, place), "center", turn=90))
            return off + 0.22 * away
        self.stroke((level, low[1] - 0.08), (level, high[1] + 0.08), name="dimension")
        middle = (low[1] + high[1]) / 2 - 0.035
        self.labels.append(Label(text, (level + 0.07 * away, middle), "left" if off > 0 else "right"))
        return off + (0.26 + text_width(text, TEXT)) * away

    def _placed(self, text: str, start: float, end: float, side: str) -> tuple[bool, float, Point]:
        """Whether the text goes between the ticks, where its middle stands, and the ends of the line."""
        width = text_width(text, TEXT)
        if width + 0.1 <= end - start:
            return True, (start + end) / 2, (start, end)
        if side == "right":
            return False, end + 0.15 + width / 2, (start - 0.08, end + 0.11)
        return False, start - 0.15 - width / 2, (start - 0.11, end + 0.08)

    def _tick(self, at: Point) -> None:
        (x, y), half = at, 0.028
        self.stroke((x - half, y - half), (x + half, y + half), pen=BAR)

    def leader(self, target: Point, offset: Point, text: str, *more: str) -> None:
        """An arrow to a point of the building from text that stands `offset` away on paper; further lines below it."""
        tip = self.paper(target)
        end = self.paper(target, offset)
        way = 1 if offset[0] >= 0 else -1
        self.stroke(tip, end, (end[0] + 0.1 * way, end[1]))
        self._arrow(tip, end)
        for number, line in enumerate((text, *more)):
            at = (end[0] + 0.14 * way, end[1] - 0.035 - 0.13 * number)
            self.labels.append(Label(line, at, "left" if way > 0 else "right"))

    def _arrow(self, tip: Point, tail: Point) -> None:
        length = math.hypot(tail[0] - tip[0], tail[1] - tip[1]) or 1.0
        u, v = (tail[0] - tip[0]) / length * 0.075, (tail[1] - tip[1]) / length * 0.075
        wing = 0.2
        corners = (tip, (tip[0] + u - wing * v, tip[1] + v + wing * u), (tip[0] + u + wing * v, tip[1] + v - wing * u))
        self.stroke(*corners, fill=INK)

    def break_line(self, start: Point, end: Point) -> None:
        """A break line between two points of the building, a little past both, with the usual kink."""
        a, b = self.paper(start), self.paper(end)
        length = math.hypot(b[0] - a[0], b[1] - a[1])
        u, v = (b[0] - a[0]) / length, (b[1] - a[1]) / length
        middle, past, kink = length / 2, 0.06, 0.06
        along = ((-past, 0.0), (middle - kink / 2, 0.0), (middle - kink / 4, kink), (middle + kink / 4, -kink))
        whole = (*along, (middle + kink / 2, 0.0), (length + past, 0.0))
        self.stroke(*((a[0] + u * s - v * t, a[1] + v * s + u * t) for s, t in whole), pen=Pen(0.5), name="break")

    def finish(self, caption: str, alt: str, verdicts: Sequence[tuple[str, str]] = ()) -> Figure:
        """Write the verdicts (what was compared, and the word) and the scale under the drawing, and render it."""
        from calcpack.figures.rendering import bounds, render

        left, bottom, _, _ = bounds(self.strokes, self.labels)
        level = bottom - 0.02
        for compared, word in verdicts:
            level -= 0.17
            self.labels.append(Label(compared, (left, level), "left"))
            after = left + text_width(compared, TEXT) + 0.12
            self.labels.append(Label(word, (after, level), "left", 8.5, weight=600))
        level -= 0.17
        self.labels.append(Label(scale_note(self.scale), (left, level), "left", SMALL, SOFT))
        # Neighbouring dimensions share ticks and extension lines, which drawn twice would look heavier.
        return render(list(dict.fromkeys(self.strokes)), self.labels, caption, alt)
