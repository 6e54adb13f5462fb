"""Reads a figure's SVG back into paper inches, so that tests measure what was drawn and not what was meant."""

from __future__ import annotations

import re
from dataclasses import dataclass
from xml.etree import ElementTree

from calcpack.figures import Figure
from calcpack.figures.lettering import text_width

SVG = "{http://www.w3.org/2000/svg}"
Box = tuple[float, float, float, float]


@dataclass(frozen=True)
class Shape:
    """A path: its part, its points in inches (y up), its style."""

    part: str
    points: tuple[tuple[float, float], ...]
    style: str

    @property
    def box(self) -> Box:
        xs, ys = [x for x, _ in self.points], [y for _, y in self.points]
        return min(xs), min(ys), max(xs), max(ys)

    @property
    def width(self) -> float:
        return self.box[2] - self.box[0]

    @property
    def height(self) -> float:
        return self.box[3] - self.box[1]

    @property
    def centre(self) -> tuple[float, float]:
        left, low, right, high = self.box
        return (left + right) / 2, (low + high) / 2

    @property
    def weight(self) -> float:
        """Line weight in points."""
        found = re.search(r"stroke-width: ([\d.]+)", self.style)
        return float(found[1]) if found else 1.0


@dataclass(frozen=True)
class Text:
    """A text element and where it lies, inches (y up)."""

    text: str
    box: Box
    size: float


def root(figure: Figure) -> ElementTree.Element:
    return ElementTree.fromstring(figure.svg)


def shapes(figure: Figure, part: str = "") -> list[Shape]:
    """The paths of a figure, all or those of one part; curves by their end points."""
    found = []
    for group in root(figure).iter(f"{SVG}g"):
        for path in group.findall(f"{SVG}path"):
            name = group.get("data-part", "")
            if part in ("", name):
                found.append(Shape(name, _points(figure, path.get("d", "")), path.get("style", "")))
    return found


def _points(figure: Figure, data: str) -> tuple[tuple[float, float], ...]:
    points = []
    for step in re.findall(r"[MLCQ][^MLCQz]*", data):
        numbers = [float(number) for number in re.findall(r"-?[\d.]+(?:e-?\d+)?", step)]
        points.append((numbers[-2] / 72, figure.height - numbers[-1] / 72))
    return tuple(points)


def _setting(style: str, name: str) -> str:
    """The value of one property of a style attribute, empty where it is not set."""
    pairs = (part.split(":", 1) for part in style.split(";") if ":" in part)
    return {key.strip(): value.strip() for key, value in pairs}.get(name, "")


def texts(figure: Figure) -> list[Text]:
    """The text elements of a figure, with the boxes they cover in the shipped face."""
    found = []
    for element in root(figure).iter(f"{SVG}text"):
        style, words = element.get("style", ""), element.text or ""
        numbers = re.findall(r"-?[\d.]+", element.get("transform", ""))
        size = float(_setting(style, "font-size").removesuffix("px"))
        width = text_width(words, size, 600 if _setting(style, "font-weight") == "600" else 400)
        back = {"start": 0.0, "middle": width / 2, "end": width}[_setting(style, "text-anchor")]
        x, y = float(numbers[-2]) / 72, figure.height - float(numbers[-1]) / 72
        rise, fall = 0.7 * size / 72, 0.03 * size / 72
        upright = (x - rise, y - back, x + fall, y - back + width)
        level = (x - back, y - fall, x - back + width, y + rise)
        found.append(Text(words, upright if abs(float(numbers[0])) == 90 else level, size))
    return found


def words(figure: Figure) -> str:
    """All text of a figure, run together with blanks."""
    return " ".join(text.text for text in texts(figure))


def overlap(one: Box, other: Box) -> bool:
    """Whether two boxes share more than a hair."""
    hair = 0.002
    return (
        one[0] < other[2] - hair and other[0] < one[2] - hair and one[1] < other[3] - hair and other[1] < one[3] - hair
    )


def crosses(start: tuple[float, float], end: tuple[float, float], box: Box) -> bool:
    """Whether a segment enters a box (clipped against its four sides)."""
    near, far = 0.0, 1.0
    for axis in (0, 1):
        low, high, here, step = box[axis], box[axis + 2], start[axis], end[axis] - start[axis]
        if abs(step) < 1e-12:
            if not low < here < high:
                return False
            continue
        first, second = sorted(((low - here) / step, (high - here) / step))
        near, far = max(near, first), min(far, second)
    return near < far
