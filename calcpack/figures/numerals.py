"""Numerals of the bars of a section, each beside its bar, on the inside of the ring the bars form. Paper inches."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence

from calcpack.figures.clearing import BLOCKED, Obstacles, centred, inked
from calcpack.figures.drawing import SMALL, Label, Point
from calcpack.figures.lettering import text_width

__all__ = ["numbered"]

_GAPS = (0.03, 0.05, 0.08, 0.12, 0.17)
Disc = tuple[Point, float]


def numbered(bars: Sequence[Disc], over: Obstacles, *, circular: bool) -> list[Label]:
    """A numeral for each bar (centre and radius), 1 and up in the order given, clear of what is in `over`."""
    far = max(abs(x) for (x, _), _ in bars), max(abs(y) for (_, y), _ in bars)
    found = []
    for number, (centre, radius) in enumerate(bars, start=1):
        inward = _inward(centre, radius, far, circular)
        rings = [list(_beside(str(number), centre, radius + gap, inward)) for gap in _GAPS]
        # One that is about as near to another bar could be read as that bar's.
        others = [other for other, _ in bars if other != centre]
        own = [[label for label in ring if _is_nearest(label, centre, others)] for ring in rings]
        # Further off only where nothing but a line to be broken would not do.
        free = next((ring for ring in own if any(over.cost(inked(label)) < BLOCKED for label in ring)), None)
        found.append(over.place(free or [label for ring in rings for label in ring]))
    return found


def _is_nearest(label: Label, centre: Point, others: Sequence[Point]) -> bool:
    left, bottom, right, top = inked(label)
    middle = ((left + right) / 2, (bottom + top) / 2)
    return 1.05 * math.dist(middle, centre) < min((math.dist(middle, other) for other in others), default=math.inf)


def _inward(centre: Point, radius: float, far: Point, circular: bool) -> float:
    """The direction from a bar to the inside of its ring, rad; down for a bar in the middle."""
    x, y = centre
    if circular:
        return math.atan2(-y, -x) if math.hypot(x, y) > radius else -math.pi / 2
    across = -math.copysign(1.0, x) if abs(x) > max(far[0] - radius, radius) else 0.0
    up = -math.copysign(1.0, y) if abs(y) > max(far[1] - radius, radius) else 0.0
    return math.atan2(up, across) if across or up else -math.pi / 2


def _beside(text: str, centre: Point, off: float, inward: float) -> Iterator[Label]:
    """A numeral beside a bar, `off` from its centre: inward first, then turned from there."""
    half = text_width(text, SMALL) / 2, 0.35 * SMALL / 72
    for turn in (0, 15, -15, 30, -30, 45, -45, 60, -60, 75, -75, 90, -90):
        way = inward + math.radians(turn)
        x, y = math.cos(way), math.sin(way)
        reach = off + abs(x) * half[0] + abs(y) * half[1]
        yield centred(text, (centre[0] + x * reach, centre[1] + y * reach), SMALL)
