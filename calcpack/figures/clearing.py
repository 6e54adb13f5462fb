"""Room for lettering: places clear of what is drawn, and lines broken where lettering stands on them. Paper inches."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, field
from itertools import pairwise

from calcpack.figures.drawing import Label, Point

__all__ = ["BLOCKED", "Box", "Obstacles", "broken", "centred", "inked", "inside_part"]

Box = tuple[float, float, float, float]
BLOCKED, _BROKEN = 100, 10
_GAP = 0.02
_HANGING = frozenset("gjpqy,;_()[]Q")


def inside_part(start: Point, end: Point, box: Box) -> tuple[float, float] | None:
    """The part of a segment inside a box as shares of its length, or None where it stays outside."""
    near, far = 0.0, 1.0
    for axis in (0, 1):
        low, high, here, step = box[axis], box[axis + 2], start[axis], end[axis] - start[axis]
        if abs(step) < 1e-12:
            if not low < here < high:
                return None
            continue
        first, second = sorted(((low - here) / step, (high - here) / step))
        near, far = max(near, first), min(far, second)
    return (near, far) if near < far else None


def broken(start: Point, end: Point, boxes: Iterable[Box]) -> list[tuple[Point, Point]]:
    """The pieces of a segment outside boxes, a small gap kept around each."""
    found = (inside_part(start, end, _grown(box, _GAP)) for box in boxes)
    pieces, reached = [], 0.0
    for near, far in sorted(part for part in found if part):
        if near > reached + 1e-9:
            pieces.append((reached, near))
        reached = max(reached, far)
    if reached < 1 - 1e-9:
        pieces.append((reached, 1.0))
    return [(_along(start, end, near), _along(start, end, far)) for near, far in pieces]


def centred(text: str, middle: Point, size: float, turn: int = 0) -> Label:
    """A label whose capitals are centred on a point."""
    (x, y), down = middle, 0.35 * size / 72
    return Label(text, (x + down, y) if turn else (x, y - down), "center", size, turn=turn)


def inked(label: Label) -> Box:
    """What a label covers: its box without the room below the line where no letter hangs there."""
    left, bottom, right, top = label.box
    if _HANGING.intersection(label.text):
        return left, bottom, right, top
    return (left, bottom, label.at[0], top) if label.turn else (left, label.at[1], right, top)


def _grown(box: Box, by: float) -> Box:
    return box[0] - by, box[1] - by, box[2] + by, box[3] + by


def _along(start: Point, end: Point, share: float) -> Point:
    return start[0] + (end[0] - start[0]) * share, start[1] + (end[1] - start[1]) * share


def _overlap(one: Box, other: Box) -> bool:
    return one[0] < other[2] and other[0] < one[2] and one[1] < other[3] and other[1] < one[3]


@dataclass
class Obstacles:
    """What lettering has to keep clear of.

    Attributes
    ----------
    within : lettering stays inside this box, where one is given
    boxes : lettering that is placed already
    discs : bars and marks, centre and radius
    lines : lines that lettering should not stand on
    breakable : lines that are broken where lettering has to stand on them
    """

    within: Box | None = None
    boxes: list[Box] = field(default_factory=list)
    discs: list[tuple[Point, float]] = field(default_factory=list)
    lines: list[tuple[Point, Point]] = field(default_factory=list)
    breakable: list[tuple[Point, Point]] = field(default_factory=list)

    def path(self, points: Sequence[Point]) -> None:
        """A line through points."""
        self.lines += pairwise(points)

    def cost(self, box: Box) -> int:
        """How badly a box stands: `BLOCKED` for each thing it covers, a tenth of it for each breakable line."""
        wide = _grown(box, _GAP)
        outside = self.within is not None and not _within(box, self.within)
        letters = sum(_overlap(wide, other) for other in self.boxes)
        discs = sum(_touches(wide, centre, radius) for centre, radius in self.discs)
        lines, breakable = (
            sum(inside_part(start, end, wide) is not None for start, end in group)
            for group in (self.lines, self.breakable)
        )
        return BLOCKED * (outside + letters + discs + lines) + _BROKEN * breakable

    def place(self, candidates: Iterable[Label]) -> Label:
        """The first of the labels that stand best; it becomes an obstacle itself."""
        best = min(candidates, key=lambda label: self.cost(inked(label)))
        self.boxes.append(inked(best))
        return best


def _within(box: Box, room: Box) -> bool:
    return box[0] >= room[0] and box[1] >= room[1] and box[2] <= room[2] and box[3] <= room[3]


def _touches(box: Box, centre: Point, radius: float) -> bool:
    x = min(max(centre[0], box[0]), box[2]) - centre[0]
    y = min(max(centre[1], box[1]), box[3]) - centre[1]
    return x * x + y * y < radius * radius
