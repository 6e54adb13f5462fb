"""Exact parts of an outline beyond a line, against shapely and against geometry worked by hand."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st
from shapely.geometry import LineString, Point, Polygon

from calcpack.figures.outline import Outline, dot

RECTANGLE = Outline(9.0, 12.0, False)
CIRCLE = Outline(10.0, 10.0, True)
ANGLES = st.floats(-math.pi, math.pi)


def unit(angle: float) -> tuple[float, float]:
    return math.cos(angle), math.sin(angle)


def whole(outline: Outline) -> Polygon:
    return Point(0, 0).buffer(outline.x, quad_segs=720) if outline.round else Polygon(outline.corners)


def half_plane(along: tuple[float, float], level: float) -> Polygon:
    """A square of 100 in whose near side is the line at `level`."""
    (x, y), far = along, 100.0
    corners = ((level, -far), (level, far), (level + far, far), (level + far, -far))
    return Polygon([(x * u - y * v, y * u + x * v) for u, v in corners])


@given(ANGLES, st.floats(0.001, 0.999))
def test_the_part_of_a_rectangle_is_exact(angle: float, share: float) -> None:
    along = unit(angle)
    level = RECTANGLE.reach(along) * (1 - 2 * share)
    expected = whole(RECTANGLE).intersection(half_plane(along, level)).area
    assert Polygon(RECTANGLE.beyond(along, level)).area == pytest.approx(expected, rel=1e-6, abs=1e-6)


@given(ANGLES, st.floats(0.1, 0.9))
def test_the_part_of_a_circle_is_its_segment(angle: float, share: float) -> None:
    along, level = unit(angle), 10 * (1 - 2 * share)
    part = CIRCLE.beyond(along, level)
    # Points at most 5 degrees apart lie inside the arc by less than 0.1 % of the radius.
    assert Polygon(part).area == pytest.approx(whole(CIRCLE).intersection(half_plane(along, level)).area, rel=0.01)
    assert all(math.hypot(*point) == pytest.approx(10.0) for point in part)
    assert min(dot(point, along) for point in part) == pytest.approx(level, abs=1e-9)


def test_the_part_on_the_limits() -> None:
    up = (0.0, 1.0)
    # At the lower face the whole, at the upper face nothing but that face, and past it nothing.
    assert Polygon(RECTANGLE.beyond(up, -12.0)).area == 18 * 24
    assert set(RECTANGLE.beyond(up, 12.0)) == {(-9.0, 12.0), (9.0, 12.0)}
    assert RECTANGLE.beyond(up, 12.01) == []
    assert CIRCLE.beyond(up, 10.0) == []
    assert Polygon(CIRCLE.beyond(up, -10.0)).area == pytest.approx(100 * math.pi, rel=0.002)


@given(ANGLES, st.floats(-8.0, 8.0), st.sampled_from([RECTANGLE, CIRCLE]))
def test_a_chord_ends_on_the_outline(angle: float, off: float, outline: Outline) -> None:
    along = unit(angle)
    point = (-along[1] * off, along[0] * off)
    found = outline.chord(point, along)
    ends = [(point[0] + s * along[0], point[1] + s * along[1]) for s in (-100.0, 100.0)]
    expected = whole(outline).intersection(LineString(ends)).length
    assert found is not None
    assert found[1] - found[0] == pytest.approx(expected, rel=1e-4)


def test_lines_that_miss() -> None:
    assert RECTANGLE.chord((9.01, 0.0), (0.0, 1.0)) is None
    assert RECTANGLE.chord((8.99, 0.0), (0.0, 1.0)) == (-12.0, 12.0)
    assert RECTANGLE.chord((0.0, 30.0), (math.sqrt(0.5), math.sqrt(0.5))) is None
    assert CIRCLE.chord((10.0, 0.0), (0.0, 1.0)) is None
    # sqrt(100 - 64) = 6.
    assert CIRCLE.chord((8.0, 0.0), (0.0, 1.0)) == pytest.approx((-6.0, 6.0))


@pytest.mark.parametrize("outline", [RECTANGLE, CIRCLE])
def test_the_extreme_point_is_as_far_as_the_reach(outline: Outline) -> None:
    for degrees in range(0, 360, 15):
        along = unit(math.radians(degrees))
        assert dot(outline.extreme(along, (along[1], -along[0])), along) == pytest.approx(outline.reach(along))


def test_of_a_face_square_to_the_direction_the_end_on_the_side_asked() -> None:
    assert RECTANGLE.extreme((0.0, 1.0), (1.0, 0.0)) == (9.0, 12.0)
    assert RECTANGLE.extreme((0.0, 1.0), (-1.0, 0.0)) == (-9.0, 12.0)
    assert CIRCLE.extreme((0.0, -1.0), (1.0, 0.0)) == (0.0, -10.0)


@pytest.mark.parametrize(
    ("outline", "centre", "holds"),
    [
        (RECTANGLE, (8.5, 11.5), True),
        (RECTANGLE, (8.6, 0.0), False),
        (RECTANGLE, (0.0, -11.6), False),
        (CIRCLE, (9.5, 0.0), True),
        (CIRCLE, (6.72, 6.72), False),  # 9.503 in from the centre
        (CIRCLE, (6.71, 6.71), True),  # 9.489 in
    ],
)
def test_a_disc_of_half_an_inch_inside(outline: Outline, centre: tuple[float, float], holds: bool) -> None:
    assert outline.holds(centre, 0.5) is holds
