"""Where a schedule's layout puts the bars. Expected places: geometry worked by hand in the comments."""

from __future__ import annotations

import itertools
import math

import pytest

from calcpack.errors import RangeError
from calcpack.figures import circular_bars, rectangular_bars

SIZE = {"b": 18.0, "h": 24.0, "cover": 1.5, "tie_d": 0.375, "d_b": 1.128}


def test_eight_bars_three_on_each_face() -> None:
    bars = rectangular_bars(**SIZE, n_x=3, n_y=3)
    # 18/2 - 1.5 - 0.375 - 1.128/2 = 6.561; 24/2 - 2.439 = 9.561.
    places = {(round(bar.x, 3), round(bar.y, 3)) for bar in bars}
    corners = {(sx * 6.561, sy * 9.561) for sx in (-1, 1) for sy in (-1, 1)}
    assert places == corners | {(0.0, 9.561), (0.0, -9.561), (6.561, 0.0), (-6.561, 0.0)}
    assert {bar.d_b for bar in bars} == {1.128}


@pytest.mark.parametrize(("n_x", "n_y", "count"), [(2, 2, 4), (2, 4, 8), (4, 2, 8), (3, 3, 8), (5, 4, 14)])
def test_the_count_of_a_layout(n_x: int, n_y: int, count: int) -> None:
    # 2 n_x + 2 n_y - 4: corners stand on two faces.
    bars = rectangular_bars(**SIZE, n_x=n_x, n_y=n_y)
    assert len(bars) == len({(bar.x, bar.y) for bar in bars}) == count
    top, right = max(bar.y for bar in bars), max(bar.x for bar in bars)
    assert sum(bar.y == top for bar in bars) == n_x
    assert sum(bar.x == right for bar in bars) == n_y


def test_evenly_spaced() -> None:
    along = sorted(bar.x for bar in rectangular_bars(**SIZE, n_x=5, n_y=2) if bar.y > 0)
    # 4 spaces in 2 x 6.561.
    assert [b - a for a, b in itertools.pairwise(along)] == pytest.approx([13.122 / 4] * 4)


def test_symmetric() -> None:
    places = {(bar.x, bar.y) for bar in rectangular_bars(**SIZE, n_x=4, n_y=5)}
    rounded = {(round(x, 9), round(y, 9)) for x, y in places}
    assert rounded == {(-x or 0.0, y) for x, y in rounded} == {(x, -y or 0.0) for x, y in rounded}


def test_a_circle_starts_on_the_x_axis() -> None:
    bars = circular_bars(h=20.0, cover=1.5, tie_d=0.5, d_b=1.0, count=10)
    # 20/2 - 1.5 - 0.5 - 0.5 = 7.5; every 36 degrees.
    assert (bars[0].x, bars[0].y) == (7.5, 0.0)
    assert (bars[1].x, bars[1].y) == pytest.approx((7.5 * math.cos(math.pi / 5), 7.5 * math.sin(math.pi / 5)))
    assert [math.hypot(bar.x, bar.y) for bar in bars] == pytest.approx([7.5] * 10)
    assert sum(bar.x for bar in bars) == pytest.approx(0.0, abs=1e-9)


def test_a_rectangle_without_room_is_refused() -> None:
    # 2 (1.5 + 0.375 + 1.128) = 6.006 in is the least side.
    assert rectangular_bars(**(SIZE | {"b": 6.0061}), n_x=2, n_y=2)
    with pytest.raises(RangeError, match=r"cover, tie and bar take 6\.006 in +b = 6\.005 in, h = 24 in: enlarge it"):
        rectangular_bars(**(SIZE | {"b": 6.005}), n_x=2, n_y=2)


def test_all_problems_of_a_layout_at_once() -> None:
    with pytest.raises(RangeError, match="the bar layout cannot be drawn") as caught:
        rectangular_bars(**(SIZE | {"d_b": 0.0, "cover": -1.0}), n_x=1, n_y=0)
    assert [p.given for p in caught.value.problems] == ["cover = -1 in", "d_b = 0 in", "n_x = 1", "n_y = 0"]


def test_a_circle_of_two_bars_is_refused() -> None:
    size = {"h": 20.0, "cover": 1.5, "tie_d": 0.5, "d_b": 1.0}
    assert len(circular_bars(**size, count=3)) == 3
    with pytest.raises(RangeError, match=r"count = 2 +3 bars or more on a circle"):
        circular_bars(**size, count=2)


def test_a_circle_without_room_is_refused() -> None:
    with pytest.raises(RangeError, match=r"radius of the bar circle = 0\.25 in +0\.5 in or more: enlarge h"):
        circular_bars(h=5.5, cover=1.5, tie_d=0.5, d_b=1.0, count=4)
