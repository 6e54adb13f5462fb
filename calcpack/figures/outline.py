"""The outline of a rectangular or circular section about its centre, and its exact parts beyond a line."""

from __future__ import annotations

import math
from dataclasses import dataclass
from itertools import pairwise

from calcpack.figures.drawing import Point, arc

__all__ = ["Outline", "dot"]


def dot(one: Point, other: Point) -> float:
    """How far one vector reaches along another."""
    return one[0] * other[0] + one[1] * other[1]


@dataclass(frozen=True)
class Outline:
    """Half the size along x and y, in any one unit; `round` makes it a circle, both halves its radius."""

    x: float
    y: float
    round: bool

    @property
    def corners(self) -> tuple[Point, ...]:
        """Of the rectangle, counterclockwise."""
        return (-self.x, -self.y), (self.x, -self.y), (self.x, self.y), (-self.x, self.y)

    def holds(self, centre: Point, radius: float) -> bool:
        """Whether a disc lies inside, or touches from inside."""
        (x, y), slack = centre, 1e-6
        if self.round:
            return math.hypot(x, y) + radius <= self.x + slack
        return abs(x) + radius <= self.x + slack and abs(y) + radius <= self.y + slack

    def reach(self, along: Point) -> float:
        """How far it reaches from its centre along a unit vector."""
        return self.x if self.round else abs(along[0]) * self.x + abs(along[1]) * self.y

    def extreme(self, along: Point, side: Point) -> Point:
        """The point furthest along a unit vector; of a face square to it, the end towards `side`."""
        if self.round:
            return along[0] * self.x, along[1] * self.x
        x, y = (one if abs(one) > 1e-9 else other for one, other in zip(along, side, strict=True))
        return math.copysign(self.x, x), math.copysign(self.y, y)

    def chord(self, point: Point, along: Point) -> tuple[float, float] | None:
        """Where a line through a point enters and leaves, as distances along a unit vector; None where it misses."""
        if self.round:
            middle, off = -dot(point, along), point[0] * along[1] - point[1] * along[0]
            half = math.sqrt(max(self.x**2 - off**2, 0.0))
            return (middle - half, middle + half) if half else None
        near, far = -math.inf, math.inf
        for here, step, limit in zip(point, along, (self.x, self.y), strict=True):
            if abs(step) < 1e-12:
                near, far = (near, far) if abs(here) < limit else (math.inf, -math.inf)
                continue
            first, second = sorted(((-limit - here) / step, (limit - here) / step))
            near, far = max(near, first), min(far, second)
        return (near, far) if near < far else None

    def beyond(self, along: Point, level: float) -> list[Point]:
        """The part that lies further along a unit vector than `level`, as a polygon; empty where there is none."""
        if self.round:
            half = math.degrees(math.acos(min(max(level / self.x, -1.0), 1.0)))
            middle = math.degrees(math.atan2(along[1], along[0]))
            return arc((0.0, 0.0), self.x, middle - half, middle + half) if half else []
        part: list[Point] = []
        for one, other in pairwise((*self.corners, self.corners[0])):
            above, next_above = dot(one, along) - level, dot(other, along) - level
            if above >= 0:
                part.append(one)
            if above * next_above < 0:
                share = above / (above - next_above)
                part.append((one[0] + (other[0] - one[0]) * share, one[1] + (other[1] - one[1]) * share))
        return part
