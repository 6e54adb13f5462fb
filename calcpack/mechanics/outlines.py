"""Plane geometry of polygon outlines: area, crossing, containment. Vertices are rows of an (n, 2) array, any sense."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = [
    "Bools",
    "Floats",
    "area_and_centroid",
    "contains",
    "counterclockwise",
    "crosses_itself",
    "distance_to_edges",
    "outlines_meet",
]

Floats = NDArray[np.float64]
Bools = NDArray[np.bool_]


def area_and_centroid(outline: Floats) -> tuple[float, Floats]:
    """Signed area, positive counterclockwise, and centroid of a polygon.

    >>> area_and_centroid(np.array([[0.0, 0.0], [4.0, 0.0], [4.0, 2.0], [0.0, 2.0]]))
    (8.0, array([2., 1.]))
    """
    start = outline[0]
    first = outline - start
    second = np.roll(first, -1, axis=0)
    cross = first[:, 0] * second[:, 1] - second[:, 0] * first[:, 1]
    area = float(cross.sum()) / 2
    if area == 0:
        return 0.0, outline.mean(axis=0)
    centroid: Floats = start + (cross[:, None] * (first + second)).sum(axis=0) / (6 * area)
    return area, centroid


def counterclockwise(outline: Floats) -> Floats:
    """The same polygon with its vertices in counterclockwise order."""
    return outline if area_and_centroid(outline)[0] > 0 else outline[::-1]


def crosses_itself(outline: Floats) -> bool:
    """Whether any two sides meet other than neighbours at their common vertex."""
    ends = np.roll(outline, -1, axis=0)
    meet = _meet(outline[:, None], ends[:, None], outline[None], ends[None])
    count = len(outline)
    gap = (np.arange(count)[:, None] - np.arange(count)) % count
    apart = (gap > 1) & (gap < count - 1)
    return bool((meet & apart).any() or _folds_back(outline).any())


def outlines_meet(one: Floats, other: Floats) -> bool:
    """Whether any side of one polygon meets any side of the other."""
    ends_of_one, ends_of_other = np.roll(one, -1, axis=0), np.roll(other, -1, axis=0)
    return bool(_meet(one[:, None], ends_of_one[:, None], other[None], ends_of_other[None]).any())


def contains(outline: Floats, points: Floats) -> Bools:
    """Which points lie inside a polygon; a point on a side may fall either way."""
    start, end = outline[:, None], np.roll(outline, -1, axis=0)[:, None]
    x, y = points[None, :, 0], points[None, :, 1]
    spans = (start[..., 1] > y) != (end[..., 1] > y)
    rise = np.where(spans, end[..., 1] - start[..., 1], 1.0)
    crossing = start[..., 0] + (y - start[..., 1]) / rise * (end[..., 0] - start[..., 0])
    inside: Bools = (spans & (x < crossing)).sum(axis=0) % 2 == 1
    return inside


def distance_to_edges(outline: Floats, points: Floats) -> Floats:
    """Distance of each point to the nearest side of a polygon."""
    start = outline[:, None]
    side = np.roll(outline, -1, axis=0)[:, None] - start
    length_squared = np.maximum((side**2).sum(axis=-1), np.finfo(float).tiny)
    share = np.clip(((points[None] - start) * side).sum(axis=-1) / length_squared, 0.0, 1.0)
    distance: Floats = np.linalg.norm(start + share[..., None] * side - points[None], axis=-1).min(axis=0)
    return distance


def _turn(a: Floats, b: Floats, c: Floats) -> Floats:
    """Twice the signed area of the triangles a, b, c."""
    turn: Floats = (b[..., 0] - a[..., 0]) * (c[..., 1] - a[..., 1])
    turn -= (b[..., 1] - a[..., 1]) * (c[..., 0] - a[..., 0])
    return turn


def _meet(a: Floats, b: Floats, c: Floats, d: Floats) -> Bools:
    """Whether the segments a-b and c-d have a point in common."""
    straddle = (_turn(a, b, c) * _turn(a, b, d) <= 0) & (_turn(c, d, a) * _turn(c, d, b) <= 0)
    low = np.maximum(np.minimum(a, b), np.minimum(c, d))
    high = np.minimum(np.maximum(a, b), np.maximum(c, d))
    met: Bools = straddle & (low <= high).all(axis=-1)
    return met


def _folds_back(outline: Floats) -> Bools:
    """Vertices that repeat the one before, or where the outline turns back on itself."""
    before, after = outline - np.roll(outline, 1, axis=0), np.roll(outline, -1, axis=0) - outline
    cross = before[:, 0] * after[:, 1] - before[:, 1] * after[:, 0]
    folded: Bools = (cross == 0) & ((before * after).sum(axis=-1) <= 0)
    return folded
