"""Axes, curves and marks of a chart, and figures side by side. A chart is laid out in inches of paper."""

from __future__ import annotations

import math
import re
from collections.abc import Sequence
from dataclasses import dataclass, field
from xml.sax.saxutils import quoteattr

from calcpack.figures.clearing import Obstacles, broken
from calcpack.figures.drawing import BAR, DIMENSION, GREY, INK, PAPER, SMALL, TEXT, Figure, Label, Pen, Point, Stroke
from calcpack.figures.lettering import text_width

__all__ = [
    "DESIGN",
    "GOVERNING",
    "LOAD",
    "MINOR",
    "Axis",
    "Chart",
    "Mark",
    "edges",
    "even_axis",
    "round_axis",
    "round_step",
    "side_by_side",
    "signed",
]

DESIGN = Pen(1.4)
# Half the height of a capital at either size of lettering.
_MIDDLE = 0.034
GRID = Pen(0.25, GREY)
_STEPS = (1.0, 2.0, 5.0, 10.0)
# From the axis to its numbers, from them to the title, the title, and the margin on both sides.
_BESIDE = 0.06 + 0.05 + 0.095 + 0.1


@dataclass(frozen=True)
class Mark:
    """A point on a chart: diameter on paper, inches, its pen and its fill."""

    diameter: float
    pen: Pen
    fill: str


LOAD = Mark(0.05, Pen(0.5), PAPER)
MINOR = Mark(0.03, DIMENSION, PAPER)
GOVERNING = Mark(0.068, Pen(0.5), INK)


@dataclass(frozen=True)
class Axis:
    """The values from `low` to `high` an axis covers, ticked at multiples of `step`."""

    low: float
    high: float
    step: float

    @property
    def ticks(self) -> list[float]:
        """Multiples of the step on the axis."""
        first, last = math.ceil(self.low / self.step - 1e-9), math.floor(self.high / self.step + 1e-9)
        return [self.step * number for number in range(first, last + 1)]

    def share(self, value: float) -> float:
        """Where a value lies, 0 at `low` and 1 at `high`."""
        return (value - self.low) / (self.high - self.low)

    def written(self, value: float) -> str:
        """A tick as a number."""
        return signed(f"{value:,.{max(0, -math.floor(math.log10(self.step) + 1e-9))}f}")


def signed(number: str) -> str:
    """A written number with a minus sign in place of a hyphen."""
    return number.replace("-", "−")


def round_step(span: float, most: int) -> float:
    """The least round step, 1, 2 or 5 in its decade, that divides a span into `most` parts or fewer."""
    rough = span / most
    decade = 10.0 ** math.floor(math.log10(rough))
    return next(step * decade for step in _STEPS if step * decade >= rough * (1 - 1e-9))


def round_axis(low: float, high: float, most: int) -> Axis:
    """The axis that covers `low` to `high`, ending at a tick or midway to the next, at the step of `round_step`."""
    step = round_step(high - low, most)
    half = step / 2
    return Axis(math.floor(low / half + 1e-9) * half, math.ceil(high / half - 1e-9) * half, step)


def even_axis(values: Sequence[float], span: float, step: float) -> Axis:
    """An axis of a given span with the values in its middle, for scales that are equal."""
    middle = (min(values) + max(values)) / 2
    return Axis(middle - span / 2, middle + span / 2, step)


def edges(x: Axis, y: Axis) -> float:
    """What numbers, title and margins take of a figure's width beside the field of its chart, inches."""
    numbers = max(text_width(y.written(value), SMALL) for value in y.ticks)
    last = text_width(x.written(x.ticks[-1]), SMALL) / 2
    return numbers + last + _BESIDE


@dataclass
class Chart:
    """Collects what stands on a chart; `x` and `y` cover `width` by `height` inches of paper.

    Attributes
    ----------
    over : what lettering on the chart keeps clear of
    """

    x: Axis
    y: Axis
    width: float
    height: float
    strokes: list[Stroke] = field(default_factory=list)
    labels: list[Label] = field(default_factory=list)
    over: Obstacles = field(default_factory=Obstacles)

    def __post_init__(self) -> None:
        self.over.within = (0.03, 0.03, self.width - 0.03, self.height - 0.03)
        for axis, start, end in (
            (self.x, (0.0, self.y.low), (0.0, self.y.high)),
            (self.y, (self.x.low, 0.0), (self.x.high, 0.0)),
        ):
            if axis.low < 0 < axis.high:
                self.over.path([self.at(start), self.at(end)])

    def at(self, point: Point) -> Point:
        """Where a point of the chart lies on paper."""
        return self.x.share(point[0]) * self.width, self.y.share(point[1]) * self.height

    def curve(self, points: Sequence[Point], pen: Pen, name: str, *, closed: bool = False) -> None:
        """A line through points of the chart; a closed one ends where it starts."""
        placed = tuple(map(self.at, points))
        self.strokes.append(Stroke(placed, pen, closed=closed, name=name))
        self.over.path(placed)

    def mark(self, point: Point, mark: Mark, name: str) -> None:
        """A mark at a point of the chart."""
        centre = self.at(point)
        self.strokes.append(Stroke((centre,), mark.pen, mark.fill, True, mark.diameter / 2, name))
        self.over.discs.append((centre, mark.diameter / 2 + mark.pen.weight / 144))

    def above(self, text: str, point: Point) -> None:
        """Write a text on a level line that starts at a point, above it where that is clear."""
        x, y = self.at(point)
        places = [(x + 0.06 * shift, y + up, "left") for up in (0.045, 0.12, -0.12) for shift in range(1, 20)]
        self._letter(text, places, 400)

    def beside(self, text: str, point: Point, *, weight: int = 400) -> None:
        """Write a text beside a point, with a leader where it has to stand off."""
        (x, y), places = self.at(point), []
        for off in (0.07, 0.14, 0.22, 0.32, 0.45, 0.6, 0.8):
            for side, anchor in ((1, "left"), (-1, "right")):
                places += [(x + side * off, y + up * off - _MIDDLE, anchor) for up in (0, 0.9, -0.9)]
        label = self._letter(text, places, weight)
        near = label.at[0] + (-0.03 if label.anchor == "left" else 0.03)
        if abs(near - x) > 0.1:
            self.strokes.append(Stroke(((near, label.at[1] + _MIDDLE), (x, y)), DIMENSION, name="leader"))

    def _letter(self, text: str, places: Sequence[tuple[float, float, str]], weight: int) -> Label:
        label = self.over.place(Label(text, (x, y), anchor, TEXT, weight=weight) for x, y, anchor in places)
        self.labels.append(label)
        return label

    def finish(
        self, heading: str, titles: tuple[str, str], legend: Sequence[tuple[Pen | Mark, str]], caption: str, alt: str
    ) -> Figure:
        """Draw frame, heading, titles of the axes along x and y, and legend, and render."""
        from calcpack.figures.rendering import render

        self._numbers()
        level = -0.26
        self.labels.append(Label(titles[0], (self.width / 2, level), "center"))
        self.labels.append(Label(heading, (0.0, self.height + 0.06), "left"))
        left = min(label.box[0] for label in self.labels)
        self.labels.append(Label(titles[1], (left - 0.05, self.height / 2), "center", turn=90))
        frame = self._frame()
        self._legend(legend, left, level - 0.2)
        return render([*frame, *self.strokes], self.labels, caption, alt)

    def _numbers(self) -> None:
        for value in self.x.ticks:
            self.labels.append(Label(self.x.written(value), (self.at((value, 0))[0], -0.125), "center", SMALL))
        for value in self.y.ticks:
            place = (-0.06, self.at((0, value))[1] - _MIDDLE)
            self.labels.append(Label(self.y.written(value), place, "right", SMALL))

    def _frame(self) -> list[Stroke]:
        """Grid, broken where lettering stands on it, lines through zero, and the two axes with their ticks."""
        grid, ticks = [], []
        for value in self.x.ticks:
            place = self.at((value, 0))[0]
            grid.append(((place, 0.0), (place, self.height), value))
            ticks.append(((place, 0.0), (place, -0.04)))
        for value in self.y.ticks:
            place = self.at((0, value))[1]
            grid.append(((0.0, place), (self.width, place), value))
            ticks.append(((0.0, place), (-0.04, place)))
        lines = [
            Stroke(piece, GRID if value else BAR, name="" if value else "zero")
            for start, end, value in sorted(grid, key=lambda line: not line[2])
            for piece in broken(start, end, self.over.boxes)
        ]
        outer = Stroke(((0.0, self.height), (0.0, 0.0), (self.width, 0.0)), BAR, name="axes")
        return [*lines, *(Stroke(tick, DIMENSION, name="tick") for tick in ticks), outer]

    def _legend(self, entries: Sequence[tuple[Pen | Mark, str]], left: float, level: float) -> None:
        """Samples with their words below the chart, in as many lines as the width needs."""
        x = left
        for sample, text in entries:
            lead = 0.27 if isinstance(sample, Pen) else 0.11
            wide = lead + text_width(text, SMALL)
            if x > left and x + wide > self.width + 0.02:
                x, level = left, level - 0.14
            middle = level + _MIDDLE
            if isinstance(sample, Pen):
                self.strokes.append(Stroke(((x, middle), (x + 0.22, middle)), sample, name="legend"))
            else:
                round_ = Stroke(((x + 0.04, middle),), sample.pen, sample.fill, True, sample.diameter / 2, "legend")
                self.strokes.append(round_)
            self.labels.append(Label(text, (x + lead, level), "left", SMALL))
            x += wide + 0.13


def side_by_side(left: Figure, right: Figure, *, gap: float = 0.25) -> Figure:
    """Two figures as one, their lower edges level.

    Parameters
    ----------
    left, right : the figures
    gap : between them, inches
    """
    width, height = left.width + gap + right.width, max(left.height, right.height)
    places = ((left, 0.0), (right, left.width + gap))
    parts = (
        f'<g transform="translate({72 * x:.4f} {72 * (height - figure.height):.4f})">{_inside(figure)}</g>\n'
        for figure, x in places
    )
    alt = f"Left: {left.alt} Right: {right.alt}"
    head = (
        f'<svg role="img" aria-label={quoteattr(alt)} stroke-linejoin="round" '
        f'width="{72 * width:.4f}pt" height="{72 * height:.4f}pt" viewBox="0 0 {72 * width:.4f} {72 * height:.4f}" '
        'xmlns="http://www.w3.org/2000/svg" version="1.1">'
    )
    svg = f"{head}\n{''.join(parts)}</svg>\n"
    return Figure(svg, f"{left.caption}. {right.caption}", alt, round(width, 4), round(height, 4))


def _inside(figure: Figure) -> str:
    """What stands between the tags of a figure's ``svg`` element."""
    found = re.fullmatch(r"<svg [^>]*>(.*)</svg>\s*", figure.svg, flags=re.S)
    return found[1] if found else figure.svg
