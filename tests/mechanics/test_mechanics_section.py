"""Geometry of a section and what is refused, every problem at once."""

from __future__ import annotations

from math import pi

import numpy as np
import pytest
from mechanics_samples import CHANNEL, CHANNEL_BARS, L_BARS, L_SHAPE, ring, tied, with_bars

from calcpack.errors import RangeError
from calcpack.mechanics import Section, circle, polygon, rectangle
from calcpack.mechanics.outlines import (
    area_and_centroid,
    contains,
    counterclockwise,
    crosses_itself,
    distance_to_edges,
    outlines_meet,
)

SQUARE = [(0.0, 0.0), (20.0, 0.0), (20.0, 20.0), (0.0, 20.0)]
BARS = [(5.0, 5.0, 1.0), (15.0, 15.0, 1.0)]
MATERIALS = {"f_c": 4000.0, "f_y": 60_000.0}


def refused(match: str, **changes: object) -> RangeError:
    given: dict = {"outline": np.array(SQUARE), "bars": np.array(BARS), **MATERIALS, **changes}
    with pytest.raises(RangeError, match=match) as caught:
        Section(**given)
    return caught.value


def test_area_and_centroid_of_an_L() -> None:
    # common practice: two rectangles, 30 by 10 and 10 by 30.
    section = with_bars(L_SHAPE, L_BARS)
    assert pytest.approx(600) == section.A_g
    assert section.centroid == pytest.approx([(300 * 15 + 300 * 5) / 600, (300 * 5 + 300 * 25) / 600])
    assert section.extent == (30, 40)
    assert section.x == pytest.approx(np.array(L_BARS)[:, 0] - 10)
    assert section.y == pytest.approx(np.array(L_BARS)[:, 1] - 15)


def test_openings_are_deducted_from_area_and_centroid() -> None:
    section = polygon(SQUARE, [(2, 2, 1.0)], **MATERIALS, openings=[[(10, 5), (15, 5), (15, 15), (10, 15)]])
    assert section.A_g == 350
    assert section.centroid == pytest.approx([(400 * 10 - 50 * 12.5) / 350, 10])


def test_sense_of_the_outline_is_free() -> None:
    one, other = with_bars(CHANNEL, CHANNEL_BARS), with_bars(CHANNEL[::-1], CHANNEL_BARS)
    assert one.A_g == pytest.approx(other.A_g)
    assert one.centroid == pytest.approx(other.centroid)
    assert area_and_centroid(counterclockwise(np.array(CHANNEL[::-1], dtype=float)))[0] > 0


def test_circle() -> None:
    section = circle(20, ring(7, 8, 0.79), **MATERIALS)
    assert section.A_g == pytest.approx(100 * pi)
    assert section.extent == (20, 20)
    assert section.loops == ()


@pytest.mark.parametrize(
    ("f_c", "beta_1"),
    # published: ACI 318-19 Table 22.2.2.4.3
    [(2500, 0.85), (4000, 0.85), (5000, 0.80), (7999, 0.65005), (8000, 0.65), (12_000, 0.65)],
)
def test_beta_1(f_c: float, beta_1: float) -> None:
    assert tied(f_c=f_c).beta_1 == pytest.approx(beta_1, rel=1e-12)


def test_axial_strength_counts_yield_up_to_80_ksi() -> None:
    # common practice: ACI 318-19 22.4.2.2 by hand, 16 x 24 in, ten bars of 1.27 in^2.
    concrete = 0.85 * 5000 * (384 - 12.7)
    assert tied(f_y=60_000).P_o == pytest.approx(concrete + 60_000 * 12.7)
    assert tied(f_y=80_000).P_o == pytest.approx(concrete + 80_000 * 12.7)
    assert tied(f_y=100_000).P_o == pytest.approx(concrete + 80_000 * 12.7)
    assert tied(f_y=100_000).P_nt_max == pytest.approx(100_000 * 12.7)


@pytest.mark.parametrize("f_c", [2500.0, 20_000.0])
def test_f_c_on_its_limits_is_allowed(f_c: float) -> None:
    assert tied(f_c=f_c).f_c == f_c


@pytest.mark.parametrize(
    ("f_c", "remedy"),
    [
        (2499.0, "correct the value"),
        (20_001.0, "correct the value"),
        (4.0, r"was this meant to be 4,000 psi\?"),
        (40.0, r"was this meant to be 4,000 psi\?"),
        (4e6, r"was this meant to be 4,000 psi\?"),
        (float("nan"), "correct the value"),
    ],
)
def test_f_c_out_of_range(f_c: float, remedy: str) -> None:
    refused(rf"f_c = .* psi +allowed 2,500 to 20,000 psi \(ACI 318 Table 19.2.1.1.*: {remedy}", f_c=f_c)


@pytest.mark.parametrize("f_y", [39_999.0, 100_001.0, 60.0])
def test_f_y_out_of_range(f_y: float) -> None:
    refused(r"f_y = .* psi +allowed 40,000 to 100,000 psi \(ASTM A615", f_y=f_y)


def test_all_numbers_that_are_wrong_are_told_at_once() -> None:
    bars = np.array([(5.0, 5.0, 0.0), (15.0, 15.0, -1.0)])
    error = refused("f_c = 40 psi", f_c=40.0, f_y=60.0, E_s=0.0, eps_cu=-0.003, bars=bars, d_b=np.array([1.0, 0.0]))
    given = [problem.given for problem in error.problems]
    assert given == [
        "f_c = 40 psi",
        "f_y = 60 psi",
        "E_s = 0",
        "eps_cu = -0.003",
        "bar 1 at (5, 5) in, area 0 in²",
        "bar 2 at (15, 15) in, area -1 in²",
        "bar 2 at (15, 15) in, d_b = 0 in",
    ]


@pytest.mark.parametrize(
    ("changes", "match"),
    [
        ({"outline": None}, "outline and diameter +one of them"),
        ({"diameter": 20.0}, "outline and diameter +one of them"),
        ({"outline": None, "diameter": 0.0}, "diameter = 0 in +a positive length"),
        ({"outline": None, "diameter": 40.0, "openings": (np.array(SQUARE),)}, "openings in a circle +a solid circle"),
        ({"outline": np.array(SQUARE[:2])}, r"outline, shape \(2, 2\) +3 or more vertices"),
        ({"outline": np.array([*SQUARE, (np.nan, 0)])}, "outline, shape .* 3 or more vertices"),
        ({"openings": (np.zeros((2, 3)),)}, r"opening 1, shape \(2, 3\)"),
        ({"bars": np.zeros((0, 3))}, r"bars, shape \(0, 3\) +1 or more rows"),
        ({"bars": np.zeros((2, 2))}, r"bars, shape \(2, 2\) +1 or more rows"),
        ({"bars": np.array([(5.0, np.inf, 1.0)])}, "1 or more rows x, y, area, finite numbers"),
        ({"d_b": np.ones(3)}, "d_b of 3 bars +one diameter a bar, 2"),
    ],
)
def test_arrays_that_cannot_be_used(changes: dict[str, object], match: str) -> None:
    refused(match, **changes)


@pytest.mark.parametrize(
    "outline",
    [
        [(0, 0), (20, 20), (20, 0), (0, 20)],
        [(0, 0), (20, 0), (20, 20), (10, 0), (0, 20)],
        [(0, 0), (20, 0), (20, 20), (20, 20), (0, 20)],
        [(0, 0), (20, 0), (20, 20), (20, 10), (20, 20), (0, 20)],
    ],
    ids=["bow tie", "touches a side", "repeats a vertex", "folds back"],
)
def test_outline_that_meets_itself(outline: list[tuple[float, float]]) -> None:
    assert crosses_itself(np.array(outline, dtype=float))
    refused("outline +sides that meet only at their ends", outline=np.array(outline, dtype=float))


def test_outline_without_area() -> None:
    line = np.array([(0.0, 0.0), (10.0, 0.0), (20.0, 0.0)])
    refused("outline +sides that meet only at their ends", outline=line)


@pytest.mark.parametrize(
    ("openings", "given"),
    [
        ([[(15, 5), (25, 5), (25, 15), (15, 15)]], "opening 1 and outline"),
        ([[(25, 5), (35, 5), (35, 15), (25, 15)]], "opening 1 and outline"),
        ([[(6, 6), (9, 6), (9, 9), (6, 9)], [(8, 8), (12, 8), (12, 12), (8, 12)]], "opening 2 and opening 1"),
        ([[(6, 6), (14, 6), (14, 14), (6, 14)], [(8, 8), (12, 8), (12, 12), (8, 12)]], "opening 2 and opening 1"),
        ([[(8, 8), (12, 8), (12, 12), (8, 12)], [(6, 6), (14, 6), (14, 14), (6, 14)]], "opening 2 and opening 1"),
    ],
    ids=["through a face", "outside", "overlapping", "inside another", "around another"],
)
def test_openings_stay_apart(openings: list[list[tuple[float, float]]], given: str) -> None:
    with pytest.raises(RangeError, match=f"{given} +openings inside the outline, clear of each other"):
        polygon(SQUARE, [(2, 2, 1.0)], **MATERIALS, openings=openings)


def test_bars_outside_are_all_named() -> None:
    bars = [(25, 5, 1.0), (5, 5, 1.0), (10, 10, 1.0)]
    with pytest.raises(RangeError, match="inside the concrete") as caught:
        polygon(SQUARE, bars, **MATERIALS, openings=[[(8, 8), (12, 8), (12, 12), (8, 12)]])
    assert [problem.given for problem in caught.value.problems] == ["bar 1 at (25, 5) in", "bar 3 at (10, 10) in"]


def test_the_whole_bar_counts_where_its_diameter_is_known() -> None:
    on_the_face = [(0.5, 10, 0.79), (10, 10, 0.79)]
    assert polygon(SQUARE, on_the_face, **MATERIALS, d_b=1.0).x.size == 2
    assert polygon(SQUARE, [(0.4, 10, 0.79)], **MATERIALS).x.size == 1
    with pytest.raises(RangeError, match=r"bar 1 at \(0.4, 10\) in +the whole bar inside the concrete"):
        polygon(SQUARE, [(0.4, 10, 0.79), (10, 10, 0.79)], **MATERIALS, d_b=1.0)
    with pytest.raises(RangeError, match=r"bar 1 at \(0, 10\) in +inside the concrete"):
        polygon(SQUARE, [(0, 10, 0.79)], **MATERIALS)


def test_bars_outside_a_circle() -> None:
    assert circle(20, [(9.5, 0, 0.79)], **MATERIALS, d_b=1.0).x.size == 1
    with pytest.raises(RangeError, match=r"bar 1 at \(9.6, 0\) in +the whole bar"):
        circle(20, [(9.6, 0, 0.79)], **MATERIALS, d_b=1.0)


def test_bars_may_touch_but_not_overlap() -> None:
    assert polygon(SQUARE, [(5, 5, 0.79), (6, 5, 0.79)], **MATERIALS, d_b=1.0).x.size == 2
    with pytest.raises(RangeError, match=r"bar 1 at \(5, 5\) in and bar 2 at \(5.9, 5\) in, 0.9 in apart"):
        polygon(SQUARE, [(5, 5, 0.79), (5.9, 5, 0.79)], **MATERIALS, d_b=1.0)
    with pytest.raises(RangeError, match="bars that do not overlap"):
        polygon(SQUARE, [(5, 5, 0.79), (5, 5, 0.79)], **MATERIALS)


def test_points_and_outlines() -> None:
    square = np.array(SQUARE)
    points = np.array([(10.0, 10.0), (30.0, 10.0), (10.0, -1.0)])
    assert contains(square, points).tolist() == [True, False, False]
    assert distance_to_edges(square, points).tolist() == [10, 10, 1]
    assert outlines_meet(square, square + 5)
    assert not outlines_meet(square, square + 25)
    assert not outlines_meet(square, square / 4 + 5)


def test_rectangle_has_its_origin_in_the_middle() -> None:
    section = rectangle(12, 20, [(-3, -7, 1.0), (3, 7, 1.0)], **MATERIALS)
    assert section.centroid.tolist() == [0, 0]
    assert section.loops[0].tolist() == [[-6, -10], [6, -10], [6, 10], [-6, 10]]
