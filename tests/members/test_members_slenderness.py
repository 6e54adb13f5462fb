"""Slender columns: what is neglected, what is magnified, what buckles, and what a row may not say."""

from __future__ import annotations

import math
import time
from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from calcpack import notebook
from calcpack.aci318 import stiffness
from calcpack.aci318.editions import EDITIONS, Edition
from calcpack.errors import RangeError
from calcpack.ledger import passes, replay
from calcpack.members.column_like import ForceLike
from calcpack.members.column_loads import LoadRow, combined
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_section import Bars, Column, Force, Story, Sway, Ties
from calcpack.members.column_slender_axis import NO_DENSITY
from calcpack.members.column_slender_bending import ASSUMED_BETA, WHOLE_SWAY
from calcpack.members.column_slender_frame import NO_FRAME
from calcpack.members.column_slenderness import (
    Magnified,
    Slenderness,
    on_sheet,
    slender_problems,
    slenderness_checks,
    story_of,
)
from calcpack.members.pad import FloatPad
from calcpack.members.results import CheckResult
from calcpack.scheduled import SheetPad
from calcpack.sheet import Sheet

FT = 12_000.0  # kip*ft in lb*in
E19 = EDITIONS["ACI 318-19"]
# 20 in square, r = 6 in: k l_u/r is 22 at 132 in, 34 at 204 in and 40 at 240 in.
SQUARE = Column(
    *("C1", 20.0, 20.0, Bars(8, 9, 3, 3), Ties("ties", 3, 18.0), 1.5, 4_000.0, 60_000.0),
    l_u=240.0,
    frame="nonsway",
    beta_dns=0.5,
    source="S-401, rev 2",
    file="inputs/columns.csv",
    row=2,
)
SWAYING = replace(SQUARE, frame="sway", k_x=1.5, k_y=1.5, delta_s=1.2)
ROUND = replace(SQUARE, b=None, bars=Bars(8, 8), ties=Ties("spiral", 4, 2.5))
STORY = Story("1", sum_P_u=1e6, V_us=40e3, Delta_o=0.5, l_c=125.0, source="FR-3, table 2")


def force(
    P: float = 400.0, x: tuple[float, float] = (0.0, 0.0), y: tuple[float, float] = (0.0, 0.0), **more: Any
) -> Force:
    """A force with end moments, in kip and kip*ft."""
    ends = dict(zip(("Mx_bottom", "Mx_top", "My_bottom", "My_top"), (M * FT for M in (*x, *y)), strict=True))
    return Force(**{"combination": "U", "P": P * 1e3, "Mx": None, "My": None, **ends, **more})


def magnified(column: Column, one: Force, story: Story | None = None, edition: Edition = E19) -> Magnified[float]:
    return Slenderness(ColumnWorking(FloatPad(), column, edition)).magnified(one, story)


def points(found: Magnified[float]) -> list[tuple[float, float, float]]:
    """Load points in kip and kip*ft."""
    return [(point.P / 1e3, point.Mx / FT, point.My / FT) for point in found.points]


def checks(column: Column, forces: list[Force], stories: list[Story] | None = None) -> list[CheckResult]:
    return slenderness_checks(ColumnWorking(FloatPad(), column, E19), forces, stories or [])


# A second derivation from first principles, in one piece


def by_hand(column: Column, P: float, bottom: float, top: float) -> tuple[float, float]:
    """Magnifier and magnified moment of a nonsway column with k = 1, bending about x; (1, 0) where neglected."""
    assert column.b is not None
    assert column.l_u is not None
    large, small = (bottom, top) if abs(bottom) >= abs(top) else (top, bottom)
    # Signed so that 1 is uniform: the share of the larger moment that acts at the other end on the same face.
    same_face = small / large if large else 1.0
    if column.l_u / (0.3 * column.h) <= min(40.0, 34.0 - 12.0 * same_face) * (1 + 1e-9):
        return 1.0, 0.0
    share = 0.6 if column.beta_dns is None else column.beta_dns
    EI = 0.4 * 57_000 * math.sqrt(column.f_c) * column.b * column.h**3 / 12 / (1 + share)
    euler = math.pi**2 * EI / column.l_u**2
    delta = max((0.6 + 0.4 * same_face) / (1 - P / (0.75 * euler)), 1.0)
    return delta, delta * max(abs(large), P * (0.6 + 0.03 * column.h))


@given(
    l_u=st.floats(60.0, 400.0),
    P=st.floats(1.0, 900.0),
    bottom=st.floats(-300.0, 300.0),
    top=st.floats(-300.0, 300.0),
    beta_dns=st.one_of(st.none(), st.floats(0.0, 1.0)),
)
def test_nonsway_columns_come_out_as_by_a_second_derivation(
    l_u: float, P: float, bottom: float, top: float, beta_dns: float | None
) -> None:
    column = replace(SQUARE, l_u=l_u, b=16.0, beta_dns=beta_dns)
    found = magnified(column, force(P, x=(bottom, top)))
    delta, M_c = by_hand(column, P * 1e3, bottom * FT, top * FT)
    (about_x, _) = found.about
    if M_c == 0.0:
        assert about_x.stability is None
    elif about_x.stability is not None and about_x.stability < 1:
        assert about_x.values["delta_ns"] == pytest.approx(delta)
        assert about_x.moment == pytest.approx(M_c)
    else:
        assert delta <= 1.0 or about_x.stability == pytest.approx(1.0)


def test_an_example_from_end_to_end(each: Edition) -> None:
    # From memory, Nilson, Darwin & Dolan, Example 9.1 (col-slender-nilson-9-1): 25.1 > 23.2, P_c 4,500 kip, 1.15, 201.
    column = replace(SQUARE, b=18.0, h=18.0, l_u=156.0, k_x=0.87, k_y=0.87, beta_dns=None)
    one = force(552.8, x=(157.6, 175.2), P_sustained=276e3)
    about_x = magnified(column, one, edition=each).about[0]
    printed = {"slenderness": 25.1, "slenderness_max": 23.2, "beta_dns": 0.50, "C_m": 0.96, "delta_ns": 1.15}
    for symbol, number in printed.items():
        assert about_x.values[symbol] == pytest.approx(number, rel=4e-3)
    assert about_x.values["P_c"] / 1e3 == pytest.approx(4_500.0, rel=3e-3)
    assert about_x.values["M_c"] / FT == pytest.approx(201.0, rel=1e-3)
    assert about_x.least is None


def test_a_column_with_axial_load_alone(each: Edition) -> None:
    # Published: CEE 415, Example 12.1: 14 in square, 12 ft, 500 kip: 34.3 > 22, least moment 510 kip*in, C_m = 1.
    column = replace(SQUARE, b=14.0, h=14.0, l_u=144.0)
    about_x = magnified(column, force(500.0), edition=each).about[0]
    assert about_x.values["slenderness"] == pytest.approx(34.3, abs=0.05)
    assert about_x.values["slenderness_max"] == 22.0
    assert about_x.values["C_m"] == 1.0
    assert about_x.values["M_2_min"] == pytest.approx(510e3)


# Neglected or not


@pytest.mark.parametrize(
    ("l_u", "ends", "neglected"),
    [
        # Single curvature, one end free of moment, double curvature: on the limit of 22, 34 and 40, and beyond it.
        (132.0, (100.0, 100.0), True),
        (132.1, (100.0, 100.0), False),
        (204.0, (100.0, 0.0), True),
        (204.1, (100.0, 0.0), False),
        (240.0, (100.0, -100.0), True),
        (240.1, (100.0, -100.0), False),
        (240.0, (100.0, -50.0), True),
        (240.0, (100.0, -49.0), False),
        (132.0, (0.0, 0.0), True),
        (132.1, (0.0, 0.0), False),
    ],
)
def test_limit_of_slenderness(l_u: float, ends: tuple[float, float], neglected: bool) -> None:
    # About y a uniform moment would not be neglected above 132 in: give it the same ends.
    found = magnified(replace(SQUARE, l_u=l_u), force(100.0, x=ends, y=ends))
    assert (found.stability is None) is neglected
    assert (found.second_order is None) is neglected
    assert all((passes(about.use or 0.0)) is neglected for about in found.about)


def test_a_neglected_force_keeps_its_end_moments() -> None:
    found = magnified(replace(SQUARE, l_u=120.0), force(100.0, x=(30.0, -50.0), y=(5.0, 8.0)))
    assert points(found) == [(100.0, 30.0, 5.0), (100.0, -50.0, 8.0)]


def test_a_single_moment_is_equal_at_both_ends() -> None:
    # 34 - 12 = 22 is exceeded at 200 in, C_m is 1, as with equal end moments in single curvature.
    column = replace(SQUARE, l_u=200.0)
    single = magnified(column, Force("U", 400e3, Mx=100.0 * FT, My=0.0))
    ends = magnified(column, force(x=(100.0, 100.0)))
    assert points(single) == points(ends)
    assert single.about[0].values["C_m"] == pytest.approx(1.0)


@pytest.mark.parametrize(("h", "r"), [(20.0, 5.0), (24.0, 6.0)])
def test_a_circular_column_has_the_same_radius_about_both_axes(h: float, r: float) -> None:
    about = magnified(replace(ROUND, h=h), force()).about
    assert [one.values["r"] for one in about] == [r, r]
    # Geometry: pi h**4/64; 0.4 E_c I_g/1.5.
    EI = 0.4 * 57_000 * math.sqrt(4_000) * math.pi * h**4 / 64 / 1.5
    assert about[0].values["P_c"] == pytest.approx(math.pi**2 * EI / 240.0**2)
    assert about[1].values["P_c"] == about[0].values["P_c"]
    assert about[0].values["M_2_min"] == about[1].values["M_2_min"] == pytest.approx(400e3 * (0.6 + 0.03 * h))


def test_each_axis_has_its_own_depth() -> None:
    # Hand: 12 by 24 in, 132 in: 132/7.2 = 18.3 about x, 132/3.6 = 36.7 about y; limit 22.
    found = magnified(replace(SQUARE, b=12.0, h=24.0, l_u=132.0), force(200.0, x=(100.0, 100.0), y=(20.0, 20.0)))
    x, y = found.about
    assert (x.stability is None, y.stability is None) == (True, False)
    assert x.values["slenderness"] == pytest.approx(132 / 7.2)
    assert y.values["slenderness"] == pytest.approx(132 / 3.6)
    assert y.values["M_2_min"] == pytest.approx(200e3 * (0.6 + 0.36))
    ((P, Mx, My),) = points(found)
    assert (P, Mx) == (200.0, 100.0)
    assert My == pytest.approx(20.0 * y.values["delta_ns"])


@pytest.mark.parametrize("P", [0.0, -1.0, -200.0])
def test_tension_and_no_axial_force_are_not_magnified(P: float) -> None:
    found = magnified(replace(SQUARE, l_u=400.0), force(P, x=(10.0, -40.0)))
    assert points(found) == [(P, 10.0, 0.0), (P, -40.0, 0.0)]
    assert (found.stability, found.second_order) == (None, None)


@pytest.mark.parametrize(
    ("one", "expected"),
    [
        (force(x=(10.0, -40.0), y=(3.0, 4.0)), [(400.0, 10.0, 3.0), (400.0, -40.0, 4.0)]),
        (Force("U", 5e5, Mx=12e4, My=-24e3), [(500.0, 10.0, -2.0)]),
        (Force("U", 5e5, Mx=None, Mx_bottom=12e4, My=0.0), [(500.0, 10.0, 0.0), (500.0, 0.0, 0.0)]),
    ],
)
def test_without_a_length_the_points_are_the_ends(one: Force, expected: list[tuple[float, float, float]]) -> None:
    column = replace(SQUARE, l_u=None)
    assert points(magnified(column, one)) == expected
    assert checks(column, [one]) == []


# Least moments


def delta_of(found: Magnified[float], axis: int) -> float:
    return found.about[axis].values["delta_ns"]


def test_least_moments_act_about_one_axis_at_a_time() -> None:
    # Hand: 400 kip (0.6 + 0.6) = 480 kip*in = 40 kip*ft, above 10 and 20 kip*ft: two points.
    found = magnified(SQUARE, force(x=(10.0, 10.0), y=(20.0, 20.0)))
    x, y = delta_of(found, 0), delta_of(found, 1)
    assert [pytest.approx(point) for point in points(found)] == [(400.0, 40 * x, 20 * y), (400.0, 10 * x, 40 * y)]


@pytest.mark.parametrize(
    ("x", "y", "expected"),
    [
        # The least moment, 40 kip*ft, about x, about y, about neither; on it neither exceeds it. A section may be
        # weaker without the least moment than with it: both are load points.
        (10.0, 60.0, [(40.0, 60.0), (10.0, 60.0)]),
        (60.0, 10.0, [(60.0, 40.0), (60.0, 10.0)]),
        (60.0, 50.0, [(60.0, 50.0)]),
        (40.0, 40.0, [(40.0, 40.0)]),
    ],
)
def test_where_one_least_moment_counts_it_is_looked_at_with_and_without(
    x: float, y: float, expected: list[tuple[float, float]]
) -> None:
    found = magnified(SQUARE, force(x=(x, x), y=(y, y)))
    deltas = delta_of(found, 0), delta_of(found, 1)
    assert [point[1:] for point in points(found)] == [
        pytest.approx((Mx * deltas[0], My * deltas[1])) for Mx, My in expected
    ]


def test_without_any_moment_the_least_one_acts_about_each_axis() -> None:
    found = magnified(SQUARE, force())
    delta = delta_of(found, 0)
    assert [pytest.approx(point) for point in points(found)] == [(400.0, 40 * delta, 0.0), (400.0, 0.0, 40 * delta)]
    assert found.about[0].values["C_m"] == 1.0


@pytest.mark.parametrize(
    ("ends", "sign"),
    [((100.0, 60.0), 1), ((-100.0, 60.0), -1), ((60.0, -100.0), -1), ((-5.0, -5.0), -1), ((-60.0, 100.0), 1)],
)
def test_the_magnified_moment_has_the_sign_of_the_larger_end(ends: tuple[float, float], sign: int) -> None:
    found = magnified(replace(SQUARE, l_u=300.0), force(x=ends, y=(100.0, 100.0)))
    (_, Mx, My), *others = points(found)
    assert all(math.copysign(1, other[1]) == math.copysign(1, Mx) == sign for other in [*others, (0, sign)])
    assert abs(Mx) == pytest.approx(max(abs(ends[0]), abs(ends[1]), 40.0) * delta_of(found, 0))
    assert My > 0


@given(P=st.floats(50.0, 1_000.0), bottom=st.floats(-200.0, 200.0), top=st.floats(-200.0, 200.0))
def test_a_magnified_moment_is_never_below_the_end_moments(P: float, bottom: float, top: float) -> None:
    found = magnified(SQUARE, force(P, x=(bottom, top), y=(top, bottom)))
    for _, Mx, My in points(found):
        if len(found.points) == 1:
            assert min(abs(Mx), abs(My)) >= max(abs(bottom), abs(top)) - 1e-9


# Growth with the load


def first_moment(P: float, beta_dns: float = 0.5) -> float:
    found = magnified(replace(SQUARE, beta_dns=beta_dns), force(P, x=(100.0, 80.0), y=(90.0, 90.0)))
    return abs(found.points[0].Mx) if found.points else math.inf


@given(P=st.floats(1.0, 1_400.0), more=st.floats(0.0, 200.0))
def test_moments_grow_with_the_axial_force(P: float, more: float) -> None:
    assert first_moment(P + more) >= first_moment(P)


@given(P=st.floats(1.0, 1_000.0))
def test_moments_do_not_jump(P: float) -> None:
    assert first_moment(P + 1e-6) == pytest.approx(first_moment(P), rel=1e-6)


@given(P=st.floats(1.0, 1_000.0), share=st.floats(0.0, 0.9))
def test_a_larger_sustained_share_never_helps(P: float, share: float) -> None:
    assert first_moment(P, share + 0.1) >= first_moment(P, share)


@given(ends=st.tuples(st.floats(-200.0, 200.0), st.floats(-200.0, 200.0)), P=st.floats(50.0, 1_000.0))
def test_faces_and_ends_may_be_named_either_way(ends: tuple[float, float], P: float) -> None:
    one, turned, mirrored = (magnified(SQUARE, force(P, x=pair)) for pair in (ends, ends[::-1], (-ends[0], -ends[1])))
    assert one.stability == turned.stability == mirrored.stability
    assert [abs(point.Mx) for point in one.points] == [abs(point.Mx) for point in mirrored.points]
    assert max(abs(point.Mx) for point in one.points) == max(abs(point.Mx) for point in turned.points)


@given(ends=st.tuples(st.floats(-200.0, 200.0), st.floats(-200.0, 200.0)), P=st.floats(50.0, 900.0))
def test_axes_of_a_square_column_may_be_exchanged(ends: tuple[float, float], P: float) -> None:
    other = (70.0, 70.0)
    one, turned = magnified(SQUARE, force(P, x=ends, y=other)), magnified(SQUARE, force(P, x=other, y=ends))
    assert {(point.Mx, point.My) for point in one.points} == {(point.My, point.Mx) for point in turned.points}


# Buckling


def reduced_critical_load(column: Column) -> float:
    """0.75 P_c of a square column with k = 1, from first principles, kip."""
    share = 0.6 if column.beta_dns is None else column.beta_dns
    EI = 0.4 * 57_000 * math.sqrt(column.f_c) * column.h**4 / 12 / (1 + share)
    assert column.l_u is not None
    return 0.75 * math.pi**2 * EI / column.l_u**2 / 1e3


@pytest.mark.parametrize(("share", "buckles"), [(0.5, False), (0.999, False), (1.0 + 1e-9, True), (1.7, True)])
def test_a_column_that_buckles_has_no_points(share: float, buckles: bool) -> None:
    P = share * reduced_critical_load(SQUARE)
    found = magnified(SQUARE, force(P, x=(50.0, 50.0)))
    assert found.stability == pytest.approx(share)
    assert (found.points == ()) is buckles
    assert (found.second_order is None) is buckles
    for point in found.points:
        assert 0 < point.Mx < math.inf


def test_a_column_that_buckles_fails_both_checks() -> None:
    P = 1.2 * reduced_critical_load(SQUARE)
    stability, second_order = checks(SQUARE, [force(100.0, x=(50.0, 50.0)), force(P, combination="heavy")])
    assert (stability.check, stability.verdict, stability.combination) == ("stability", "NG", "heavy")
    assert stability.ratio == pytest.approx(1.2)
    assert (second_order.check, second_order.verdict, second_order.ratio) == ("second-order moment", "NG", None)
    assert second_order.notes == ("No magnifier exists in heavy: see stability.",)


def test_exactly_at_the_reduced_critical_load_no_magnifier_exists() -> None:
    # A ratio of 1.0 passes elsewhere; here the equation divides by zero.
    limit = magnified(SQUARE, force()).about[0].values["P_c_reduced"]
    one = Force("U", limit)
    assert magnified(SQUARE, one).points == ()
    stability, _ = checks(SQUARE, [one])
    assert (stability.ratio, stability.verdict) == (1.0, "NG")


def test_half_the_length_is_four_times_as_stable() -> None:
    long, short = replace(SQUARE, l_u=400.0), replace(SQUARE, l_u=200.0)
    assert magnified(long, force(200.0)).stability == pytest.approx(4 * (magnified(short, force(200.0)).stability or 0))


# Effective length


@pytest.mark.parametrize(
    ("changes", "k"),
    [
        ({}, 1.0),
        ({"k_x": 0.8}, 0.8),
        # Published readings at 2 and 2: 0.855; both ends fixed 0.5.
        ({"psi_x_bottom": 2.0, "psi_x_top": 2.0}, 0.85528),
        ({"psi_x_bottom": 0.0, "psi_x_top": 0.0}, 0.5),
        ({"k_x": 0.8, "psi_x_bottom": 2.0, "psi_x_top": 2.0}, 0.8),
    ],
)
def test_effective_length_of_a_nonsway_column(changes: dict[str, Any], k: float) -> None:
    found = magnified(replace(SQUARE, l_u=600.0, **changes), force(20.0)).about
    assert found[0].values["k"] == pytest.approx(k, abs=1e-5)
    assert found[1].values["k"] == 1.0


@pytest.mark.parametrize(
    ("changes", "k"),
    [
        ({"k_x": 1.7}, 1.7),
        ({"psi_x_bottom": 2.0, "psi_x_top": 2.0}, 1.5895),
        ({"psi_x_bottom": 0.0, "psi_x_top": 0.0}, 1.0),
    ],
)
def test_effective_length_of_a_sway_column_decides_what_is_neglected(changes: dict[str, Any], k: float) -> None:
    plain = replace(SQUARE, frame="sway", k_y=1.0, story="1", **changes)
    limit = 22.0 * 6.0 / k
    short, long = (magnified(replace(plain, l_u=length), force(), STORY) for length in (limit * 0.999, limit * 1.001))
    assert short.about[0].stability is None
    assert short.about[0].values["k"] == pytest.approx(k, abs=5e-5)
    assert long.about[0].stability is not None


def test_the_root_of_the_chart_is_confirmed_on_the_pad(steps: Any) -> None:
    column = replace(SQUARE, psi_x_bottom=1.0, psi_x_top=3.0)
    Slenderness(ColumnWorking(steps, column, E19)).magnified(force())
    assert abs(steps.values["delta_k"]) < 1e-6
    (bottom,) = [one for one in steps.givens if one.symbol == "psi_A"]
    assert bottom.source == "S-401, rev 2 (inputs/columns.csv, row 2)"


def test_a_sway_column_needs_an_effective_length(each: Edition) -> None:
    with pytest.raises(RangeError, match=r"k_x is empty in a sway frame +k, or psi at both ends"):
        magnified(replace(SWAYING, k_x=None, delta_s=None), force(), STORY, each)


# Sway frames


def test_stated_magnifier_of_sway_moments() -> None:
    # Hand: 1.2 * 60 = 72 and 1.2 * 80 = 96 kip*ft; 240/6 = 40 with k = 1; M_1/M_2 = 0.75, C_m = 0.3, delta_ns = 1.
    found = magnified(SWAYING, force(x=(60.0, -80.0), y=(90.0, -90.0)))
    assert [pytest.approx(point) for point in points(found)] == [(400.0, -96.0, 108.0)]
    assert found.about[0].ends == pytest.approx((72.0 * FT, -96.0 * FT))
    assert found.second_order == pytest.approx(1.2 / 1.4)


def test_only_the_sway_part_is_magnified() -> None:
    # Hand: 60 of which 50 by sway: 10 + 1.2 * 50 = 70; -80 of which -50: -30 - 60 = -90.
    one = force(x=(60.0, -80.0), y=(90.0, -90.0), sway=Sway(50 * FT, -50 * FT, 0.0, 0.0))
    found = magnified(SWAYING, one)
    assert found.about[0].ends == pytest.approx((70.0 * FT, -90.0 * FT))
    assert found.about[1].ends == (90.0 * FT, -90.0 * FT)


def test_a_single_moment_in_a_sway_frame_is_magnified_once() -> None:
    # Hand: 1.2 * 60 = 72 kip*ft at both ends, then for curvature between them with C_m = 1.
    whole = magnified(SWAYING, Force("U", 400e3, Mx=60 * FT, My=0.0))
    parts = magnified(SWAYING, Force("U", 400e3, Mx=60 * FT, My=0.0, sway=Sway(30 * FT, 30 * FT, 0.0, 0.0)))
    assert whole.about[0].ends == pytest.approx((72 * FT, 72 * FT))
    assert parts.about[0].ends == pytest.approx((66 * FT, 66 * FT))
    assert whole.points[0].Mx == pytest.approx(72 * FT * delta_of(whole, 0))


def test_curvature_between_the_ends_counts_with_sway_magnified_moments() -> None:
    # 6.6.4.6.4: M_1 and M_2 of C_m are those after sway; 20 + 1.5 * 40 = 80 and 100 - 1.5 * 40 = 40 exchange places.
    one = force(x=(60.0, 60.0), sway=Sway(40 * FT, -40 * FT, 0.0, 0.0))
    about_x = magnified(replace(SWAYING, delta_s=1.5), one).about[0]
    assert about_x.ends == pytest.approx((80 * FT, 40 * FT))
    assert about_x.values["C_m"] == pytest.approx(0.6 + 0.4 * 0.5)


def test_the_column_between_its_ends_is_braced() -> None:
    # The stated k of 1.5 is that of sway; between the ends k is 1.0, or that of the restraint.
    plain = magnified(SWAYING, force()).about[0]
    held = magnified(replace(SWAYING, psi_x_bottom=2.0, psi_x_top=2.0), force()).about[0]
    assert plain.values["k"] == 1.0
    assert held.values["k"] == pytest.approx(0.85528, abs=1e-5)
    assert held.values["P_c"] == pytest.approx(plain.values["P_c"] / 0.85528**2, rel=1e-4)


def test_tension_in_a_sway_frame_still_sways() -> None:
    found = magnified(SWAYING, force(-50.0, x=(60.0, -80.0)))
    assert [pytest.approx(point) for point in points(found)] == [(-50.0, 72.0, 0.0), (-50.0, -96.0, 0.0)]
    assert (found.stability, found.second_order) == (None, None)


def test_a_short_sway_column_takes_a_magnifier_that_the_row_states() -> None:
    # 1.5 * 80/6 = 20 is below 22: neglected, unless an analysis of the frame has given its magnifier.
    short = replace(SWAYING, l_u=80.0)
    one = force(x=(60.0, -80.0))
    assert magnified(short, one).about[0].ends == pytest.approx((72 * FT, -96 * FT))
    neglected = magnified(replace(short, delta_s=None), one)
    assert points(neglected) == [(400.0, 60.0, 0.0), (400.0, -80.0, 0.0)]
    assert neglected.stability is None


FROM_STORY = replace(SWAYING, delta_s=None, story="1")


def story_with(Q: float, **changes: Any) -> Story:
    # Q = 1,000 kip * Delta_o/(40 kip * 125 in).
    return replace(STORY, Delta_o=5.0 * Q, **changes)


@pytest.mark.parametrize(
    ("Q", "sum_P_c", "delta_s"),
    [
        # 1/(1 - Q) up to 1.5, on it at Q = 1/3; beyond it 1/(1 - 1,000/(0.75 sum P_c)).
        (0.1, None, 1 / 0.9),
        (0.2, 2e6, 1.25),
        (1 / 3, None, 1.5),
        (0.4, 4e6, 1.5),
        (1.0, 4e6, 1.5),
        (2.5, 8e6, 1.2),
    ],
)
def test_magnifier_from_the_story(Q: float, sum_P_c: float | None, delta_s: float) -> None:
    found = magnified(FROM_STORY, force(x=(60.0, -80.0)), story_with(Q, sum_P_c=sum_P_c))
    assert found.about[0].ends == pytest.approx((60 * FT * delta_s, -80 * FT * delta_s))


@pytest.mark.parametrize(("Q", "sway"), [(0.04, False), (0.05, False), (0.0501, True)])
def test_a_story_with_a_small_index_is_nonsway(Q: float, sway: bool, steps: Any) -> None:
    slender = Slenderness(ColumnWorking(steps, FROM_STORY, E19))
    found = slender.magnified(force(x=(60.0, -80.0)), story_with(Q))
    assert (found.about[0].ends[0] > 60 * FT) is sway
    # As a nonsway column it is neglected: 40 against 34 + 12 * 0.75 up to 40.
    assert (found.about[0].stability is None) is not sway
    said = "Q of story 1 does not exceed 0.05: it is taken as nonsway, 6.6.4.3(b)."
    assert (said in steps.reasons and said in slender.notes) is not sway


def test_without_the_loads_of_the_story_the_error_says_what_is_missing(each: Edition) -> None:
    with pytest.raises(
        RangeError,
        match=r"column C1\n  story 1: Q = 0.4, from which delta_s exceeds 1.5, and sum_P_c is empty +sum_P_c of the "
        rf"story, or delta_s of a second-order analysis \({each.name} 6.6.4.6.2\)(.|\n)*inputs/columns.csv, row 2",
    ):
        magnified(FROM_STORY, force(x=(60.0, -80.0)), story_with(0.4), each)


def test_without_a_story_the_error_says_what_is_missing() -> None:
    with pytest.raises(
        RangeError, match=r"delta_s is empty in a sway frame, and no row of its story is there +delta_s, or"
    ):
        magnified(FROM_STORY, force())


@pytest.mark.parametrize(("sum_P_c", "ratio"), [(4e6 / 3, 1.0), (1e6, 4 / 3)])
def test_a_story_that_buckles_has_no_points(sum_P_c: float, ratio: float) -> None:
    story = story_with(0.5, sum_P_c=sum_P_c)
    found = magnified(FROM_STORY, force(x=(60.0, -80.0)), story)
    assert found.points == ()
    assert found.stability == pytest.approx(ratio)
    stability, second_order = checks(FROM_STORY, [force(x=(60.0, -80.0))], [story])
    assert (stability.verdict, second_order.verdict) == ("NG", "NG")
    assert stability.ratio == pytest.approx(ratio)
    assert stability.clause == "6.6.4.6.2(b)"


def test_row_of_the_story() -> None:
    every, wind = replace(STORY), replace(STORY, combination="1.2D+W", V_us=60e3)
    other = replace(STORY, story="2")
    column = replace(SWAYING, story="1")
    assert story_of(column, force(combination="1.2D+W"), [other, every, wind]) is wind
    assert story_of(column, force(combination="1.4D"), [other, every, wind]) is every
    assert story_of(column, force(combination="1.4D"), [other, wind]) is None
    assert story_of(SQUARE, force(), [replace(STORY, story="")]) is None


# Sustained share, stiffness, lightweight concrete


def share_of(column: Column, one: Force) -> float:
    return magnified(column, one).about[0].values["beta_dns"]


def test_sustained_share_is_of_the_row_else_of_the_combination_else_assumed() -> None:
    formed = force(P_sustained=100e3)
    unsaid = replace(SQUARE, beta_dns=None)
    assert share_of(SQUARE, formed) == 0.5
    assert share_of(unsaid, formed) == 0.25
    assert share_of(unsaid, force()) == 0.6
    assert share_of(replace(SQUARE, beta_dns=0.0), formed) == 0.0
    assert share_of(unsaid, force(P_sustained=900e3)) == 1.0


def test_stiffness_that_counts_the_bars() -> None:
    # Second derivation: 0.2 E_c I_g and the bars one by one, over 1.5; 16 by 20 in with 10 No. 9, three rows along y
    # beside those at the corners: inset 1.5 + 0.375 + 0.564 = 2.439 in, rows at 7.561 and 2.520 in, bars at 5.561 in.
    column = replace(SQUARE, b=16.0, bars=Bars(10, 9, 3, 4))
    slender = Slenderness(ColumnWorking(FloatPad(), column, E19), stiffness.stiffness_bars)
    I_se = 6 * 7.561**2 + 4 * (7.561 / 3) ** 2, 8 * 5.561**2
    I_g = 16 * 20**3 / 12, 20 * 16**3 / 12
    for axis, about in enumerate(slender.magnified(force(50.0)).about):
        EI = (0.2 * 57_000 * math.sqrt(4_000) * I_g[axis] + 29e6 * I_se[axis]) / 1.5
        assert about.values["P_c"] == pytest.approx(math.pi**2 * EI / 240.0**2)


def test_stiffness_that_counts_the_bars_of_a_circle() -> None:
    # Hand: eight No. 8 on a circle of 20 - 2 * 2 - 1 = 15 in: 8 * 0.79 * 7.5**2/2 = 177.75 in^4.
    slender = Slenderness(ColumnWorking(FloatPad(), ROUND, E19), stiffness.stiffness_bars)
    EI = (0.2 * 57_000 * math.sqrt(4_000) * math.pi * 20**4 / 64 + 29e6 * 177.75) / 1.5
    for about in slender.magnified(force(50.0)).about:
        assert about.values["P_c"] == pytest.approx(math.pi**2 * EI / 240.0**2)


def test_lightweight_concrete_is_taken_at_its_least_density(steps: Any) -> None:
    plain, light = magnified(SQUARE, force()), magnified(replace(SQUARE, lamb=0.85), force())
    assert (light.stability or 0) / (plain.stability or 1) == pytest.approx(57_000 / (33 * 90**1.5))
    slender = Slenderness(ColumnWorking(steps, replace(SQUARE, lamb=0.75), E19))
    slender.magnified(force())
    assert slender.notes == (NO_DENSITY,)
    assert NO_DENSITY in steps.reasons


@pytest.mark.parametrize(
    ("changes", "note"),
    [
        ({"beta_dns": None}, ASSUMED_BETA),
        ({"frame": None}, NO_FRAME),
        ({"frame": "sway", "delta_s": 1.2, "k_x": 1.2, "k_y": 1.2}, WHOLE_SWAY),
        ({"lamb": 0.85}, NO_DENSITY),
    ],
)
def test_what_was_assumed_is_noted(changes: dict[str, Any], note: str, steps: Any) -> None:
    results = slenderness_checks(ColumnWorking(steps, replace(SQUARE, **changes), E19), [force(), force(300.0)])
    assert [result.notes for result in results] == [(note,), (note,)]
    assert steps.reasons.count(note) == 1


def test_nothing_is_noted_where_everything_is_stated() -> None:
    assert [result.notes for result in checks(SQUARE, [force()])] == [(), ()]


# Checks over all combinations

MANY = [
    force(300.0, x=(100.0, 100.0), y=(50.0, 50.0), combination="bent"),
    force(900.0, x=(200.0, -200.0), y=(200.0, -200.0), combination="heavy, double curvature"),
    force(700.0, x=(150.0, 150.0), combination="single curvature"),
    force(-50.0, x=(10.0, 10.0), combination="uplift"),
]


def test_the_governing_combinations_are_found(each: Edition) -> None:
    results = slenderness_checks(ColumnWorking(FloatPad(), replace(SQUARE, l_u=250.0), each), MANY)
    alone = [magnified(replace(SQUARE, l_u=250.0), one, edition=each) for one in MANY]
    assert [result.check for result in results] == ["stability", "second-order moment"]
    assert results[0].ratio == pytest.approx(max(found.stability or 0.0 for found in alone))
    assert results[1].ratio == pytest.approx(max(found.second_order or 0.0 for found in alone))
    assert [result.combination for result in results] == ["heavy, double curvature", "single curvature"]
    assert [result.clause for result in results] == ["6.6.4.5.2", "6.2.6" if each.name.endswith("14") else "6.2.5.3"]


def test_results_show_the_numbers_of_the_governing_axis() -> None:
    stability, second_order = checks(SQUARE, MANY)
    for result in (stability, second_order):
        assert result.values["slenderness"] == (40.0, "")
        assert result.values["r"] == (6.0, "in")
        assert result.values["k"] == (1.0, "")
        assert result.values["P_c"][1] == "kip"
        assert result.values["M_c"][1] == "kip*ft"
    assert second_order.values["delta_ns"][0] == pytest.approx(1.4 * (second_order.ratio or 0.0))


@pytest.mark.parametrize(("P", "verdict"), [(400.0, "OK"), (500.0, "NG")])
def test_second_order_moments_are_limited(P: float, verdict: str) -> None:
    # Hand: 0.75 P_c = 0.75 pi**2 * 0.4 * 3,605 * 13,333/(1.5 * 240**2) = 1,647 kip; 1/(1 - P/1,647) is
    # 1.32 at 400 kip and 1.44 at 500 kip.
    limit = reduced_critical_load(SQUARE)
    assert limit == pytest.approx(1_647.0, abs=2.0)
    delta = 1 / (1 - P / limit)
    second_order = checks(SQUARE, [force(P, x=(300.0, 300.0), y=(300.0, 300.0))])[1]
    assert second_order.ratio == pytest.approx(delta / 1.4)
    assert second_order.verdict == verdict


def test_on_the_limit_of_second_order_moments() -> None:
    # delta_ns = 1.4 where P_u = 0.75 P_c (1 - 1/1.4).
    P = reduced_critical_load(SQUARE) * (1 - 1 / 1.4)
    second_order = checks(SQUARE, [force(P, x=(300.0, 300.0))])[1]
    assert second_order.ratio == pytest.approx(1.0)
    assert second_order.verdict == "OK"


def test_a_column_that_is_short_in_every_combination(each: Edition) -> None:
    column = replace(SQUARE, l_u=120.0)
    (result,) = slenderness_checks(ColumnWorking(FloatPad(), column, each), MANY)
    assert (result.check, result.verdict) == ("slenderness", "OK")
    assert result.clause == ("6.2.5" if each.name.endswith("14") else "6.2.5.1")
    # Hand: 120/6 = 20 against 34 - 12 = 22, the least limit of the combinations.
    assert result.ratio == pytest.approx(20 / 22)
    assert result.values["slenderness_max"] == (22.0, "")


def test_a_short_column_of_a_sway_frame() -> None:
    (result,) = checks(replace(SWAYING, delta_s=None, l_u=80.0), MANY)
    assert (result.check, result.verdict) == ("slenderness", "OK")
    assert result.ratio == pytest.approx(1.5 * 80 / 6 / 22)


def test_a_column_that_nothing_compresses_is_not_called_on() -> None:
    (result,) = checks(SQUARE, [MANY[-1]])
    assert (result.check, result.ratio, result.verdict) == ("slenderness", 0.0, "OK")
    assert result.notes == ("No combination compresses the column: its slenderness is not called on.",)


@pytest.mark.parametrize("forces", [[], [force(combination=None)]])
def test_without_factored_forces_nothing_is_decided(forces: list[Force]) -> None:
    (result,) = checks(SQUARE, forces)
    assert (result.ratio, result.verdict) == (None, "")
    assert result.notes == ("No forces listed for this column: its slenderness is not called on.",)


# The pad


def test_the_governing_combinations_alone_are_printed(steps: Any) -> None:
    column = replace(SQUARE, l_u=250.0)
    slenderness_checks(ColumnWorking(steps, column, E19), MANY)
    said = [text for text in steps.reasons if text.startswith("Governing")]
    assert said == [
        "Governing: heavy, double curvature, the largest P_u over 0.75 P_c of 4 combinations.",
        "Governing: single curvature, the largest moment over 1.4 times the first-order one of 4 combinations.",
    ]
    assert [one.value for one in steps.givens if one.symbol == "P_u"] == [900e3, 700e3]
    # What does not depend on the load is worked once for each axis.
    worked = [name for kind, name in steps.steps if kind == "worked"]
    assert (worked.count("E_c"), worked.count("P_c"), worked.count("r")) == (1, 2, 2)
    assert steps.told("verdict") == [
        "C1: axial force within 0.75 of the critical load, bending about x",
        "C1: moment with second-order effects within 1.4 of the first-order one, bending about x",
    ]


def test_a_force_is_worked_once(steps: Any) -> None:
    work = ColumnWorking(steps, SQUARE, E19)
    slender = Slenderness(work)
    first = slender.magnified(MANY[2])
    before = len(steps.steps)
    assert slender.magnified(MANY[2]) is first
    assert len(steps.steps) == before
    slenderness_checks(work, [MANY[2]], slender=slender)
    assert [name for kind, name in steps.steps[before:] if kind in ("given", "worked")] == []


LENGTHS, MOMENTS = st.floats(60.0, 350.0), st.floats(-250.0, 250.0)


@settings(suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(
    l_u=LENGTHS,
    P=st.floats(-100.0, 1_500.0),
    x=st.tuples(MOMENTS, MOMENTS),
    y=st.tuples(MOMENTS, MOMENTS),
    frame=st.sampled_from([None, "nonsway", "sway", "story"]),
    b=st.sampled_from([None, 16.0, 20.0]),
)
def test_bulk_and_print_come_to_the_same(
    recording: Any, l_u: float, P: float, x: Any, y: Any, frame: str | None, b: float | None
) -> None:
    base = FROM_STORY if frame == "story" else SWAYING if frame == "sway" else replace(SQUARE, frame=frame)
    column = replace(base, l_u=l_u, b=b, bars=Bars(8, 9) if b is None else base.bars, beta_dns=None)
    one = force(P, x=x, y=y, P_sustained=0.4e3 * P, sway=Sway(x[0] * 6e3, x[1] * 6e3, 0.0, y[1] * 6e3))
    printed = recording()
    results = [
        slenderness_checks(ColumnWorking(pad, column, E19), [one], [story_with(0.15)]) for pad in (FloatPad(), printed)
    ]
    assert results[0] == results[1]
    for verdict in printed.verdicts:
        assert verdict.ratio in [result.ratio for result in results[0]]


def test_bulk_is_fast() -> None:
    # Two orders below what a sheet takes; the bound is ten times what an ordinary machine needs.
    slender = Slenderness(ColumnWorking(FloatPad(), replace(SQUARE, beta_dns=None), E19))
    forces = [force(400.0 + i / 10, x=(100.0, 80.0), y=(50.0, 60.0), P_sustained=2e5) for i in range(500)]
    begun = time.process_time()
    for one in forces:
        slender.magnified(one)
    assert (time.process_time() - begun) / len(forces) < 1e-3


# A real sheet

JOB = """
[job]
number = "26-100"
title = "Invented sheds"
location = "Nowhere"
client = "Nobody"
firm = "No firm"
[codes]
building = "IBC 2021"
concrete = "{code}"
loads = "ASCE 7-16"
[units]
system = "US"
[people.abc]
name = "A. B. C."
role = "originator"
[[revision]]
letter = "A"
date = 2026-11-02
purpose = "Plan review"
description = "First issue"
"""


@pytest.mark.filterwarnings("ignore::DeprecationWarning")
@pytest.mark.parametrize(
    "column",
    [SQUARE, ROUND, replace(SQUARE, l_u=100.0), replace(FROM_STORY, k_x=None, psi_x_bottom=1.0, psi_x_top=2.0)],
    ids=["square", "round", "short", "sway"],
)
def test_a_sheet_replays_to_the_same_verdicts(
    column: Column, each: Edition, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    (tmp_path / "inputs").mkdir()
    (tmp_path / "job.toml").write_text(JOB.format(code=each.name), "utf-8")
    shown: list[Any] = []
    monkeypatch.setattr(notebook, "show", shown.append)
    sheet = Sheet("C-01", "Slender columns", tmp_path)
    forces = [force(350.0, x=(60.0, -80.0), y=(-30.0, -45.0))]
    found = slenderness_checks(ColumnWorking(SheetPad(sheet), column, each), forces, [story_with(0.15)])
    bulk = slenderness_checks(ColumnWorking(FloatPad(), column, each), forces, [story_with(0.15)])
    assert found == bulk
    assert [one for one in replay(sheet.ledger.to_json()) if not one.agrees] == []
    verdicts = [entry.ratio for entry in sheet.ledger if entry.kind == "verdict"]
    assert verdicts == [result.ratio for result in found]


def formed(wind: float) -> list[ForceLike]:
    """Combinations of invented unfactored rows."""
    rows = [
        LoadRow("D", 120e3, Mx=None, Mx_bottom=20 * FT, Mx_top=-25 * FT, My=5 * FT),
        LoadRow("L", 90e3, Mx=15 * FT, My=0.0),
        LoadRow("W", 10e3, Mx=None, Mx_bottom=wind * FT, Mx_top=-wind * FT, My=0.0),
    ]
    return combined(FROM_STORY, rows, "ASCE 7-16")


def test_values_of_a_combination_that_was_formed_are_worked_from_its_loads(steps: Any) -> None:
    column = replace(FROM_STORY, beta_dns=None)
    results = slenderness_checks(ColumnWorking(steps, column, E19), formed(40.0), [story_with(0.2)])
    assert results == slenderness_checks(ColumnWorking(FloatPad(), column, E19), formed(40.0), [story_with(0.2)])
    stated = {one.symbol for one in steps.givens}
    assert stated.isdisjoint({"P_u", "P_sustained", "M_ux_bottom", "M_sx_top", "M_uy"})
    assert {"P_D", "M_x_bottom_W", "M_y_D"} <= stated
    worked = [name for kind, name in steps.steps if kind == "worked"]
    assert {"P_u", "P_sustained", "M_ux_bottom", "M_sx_bottom", "beta_dns"} <= set(worked)


def test_gravity_combinations_have_no_sway_moments(steps: Any) -> None:
    (gravity,) = [one for one in formed(40.0) if (one.combination or "").endswith("1.4D")]
    slender = on_sheet(ColumnWorking(steps, FROM_STORY, E19))
    found = slender.magnified(gravity, story_with(0.2))
    assert found.about[0].ends == pytest.approx((28.0 * FT, -35.0 * FT))
    assert "No part of the moment about x is caused by wind or earthquake." in steps.reasons
    assert WHOLE_SWAY not in slender.notes


# What a row may not say


@pytest.mark.parametrize(
    ("changes", "given", "allowed"),
    [
        ({"k_x": None}, "k_x is empty in a sway frame", "k_x, or psi_x_bottom and psi_x_top (ACI 318-19 6.6.4.4.3)"),
        ({"k_y": 0.99}, "k_y = 0.99", "1.0 and up in a sway frame (ACI 318-19 6.6.4.4.3)"),
        ({"delta_s": 0.99}, "delta_s = 0.99", "1.0 and up (ACI 318-19 6.6.4.6.2)"),
        ({"delta_s": math.inf}, "delta_s = inf", "1.0 and up (ACI 318-19 6.6.4.6.2)"),
        ({"beta_dns": -0.01}, "beta_dns = -0.01", "0 to 1 (ACI 318-19 6.6.4.4.4)"),
        ({"beta_dns": 1.01}, "beta_dns = 1.01", "0 to 1 (ACI 318-19 6.6.4.4.4)"),
        ({"psi_y_top": 1.0}, "psi_y_top alone", "both psi_y_bottom and psi_y_top, or none"),
        (
            {"psi_x_bottom": -0.1, "psi_x_top": 1.0},
            "psi_x_bottom = -0.1",
            "zero or more: stiffness of the columns over that of the beams",
        ),
        (
            {"frame": "nonsway"},
            "delta_s = 1.2 in a frame that is nonsway",
            "delta_s magnifies moments of a sway frame",
        ),
        (
            {"frame": None},
            "delta_s = 1.2 in a frame that is not stated",
            "delta_s magnifies moments of a sway frame",
        ),
        ({"frame": "nonsway", "delta_s": None, "k_x": 0.0}, "k_x = 0", "a factor above zero"),
    ],
)
def test_a_wrong_row(changes: dict[str, Any], given: str, allowed: str) -> None:
    (problem,) = slender_problems(replace(SWAYING, **changes), E19)
    assert (problem.given, problem.allowed) == (given, allowed)


@pytest.mark.parametrize(
    "column",
    [
        SQUARE,
        ROUND,
        SWAYING,
        replace(SWAYING, k_x=1.0, delta_s=1.0, beta_dns=0.0),
        replace(SWAYING, k_x=None, psi_x_bottom=0.0, psi_x_top=10.0, beta_dns=1.0),
        replace(SWAYING, k_x=None, k_y=None, l_u=None),
        replace(SQUARE, frame=None, k_x=0.5),
    ],
)
def test_a_right_row(column: Column, each: Edition) -> None:
    assert list(slender_problems(column, each)) == []


def test_all_problems_are_told_at_once(each: Edition) -> None:
    wrong = replace(SWAYING, k_x=None, k_y=0.5, beta_dns=2.0, delta_s=0.5, psi_y_top=-1.0)
    found = [problem.given for problem in slender_problems(wrong, each)]
    assert found == [
        *["k_x is empty in a sway frame", "psi_y_top = -1", "psi_y_top alone", "k_y = 0.5"],
        *["beta_dns = 2", "delta_s = 0.5"],
    ]
    assert all(each.name in problem.allowed for problem in slender_problems(replace(wrong, psi_y_top=None), each))
