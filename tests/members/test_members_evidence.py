"""Evidence of strength: what a hand reworks from the page comes to what the design surface found."""

from __future__ import annotations

import math
import random
from collections.abc import Sequence
from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest
from job_samples import Shown, make_job
from scipy.integrate import quad
from shapely.geometry import Polygon, box

from calcpack.aci318.bars import BARS
from calcpack.aci318.editions import EDITIONS, Edition
from calcpack.errors import SheetError
from calcpack.job import load
from calcpack.ledger import Entry, replay
from calcpack.mechanics import NOMINAL, Surface
from calcpack.members.column import Context, check, work_column
from calcpack.members.column_bending import work_strength
from calcpack.members.column_block import Axes, NeutralAxis, bending_axes, work_block
from calcpack.members.column_reciprocal import BAND
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_section import Bars, Column, Force, Ties
from calcpack.members.interaction import Interaction, LoadPoint
from calcpack.members.pad import FloatPad
from calcpack.package.members import check_members
from calcpack.sheet import Sheet
from calcpack.typeset.digits import last_place, parse_number

# handcalcs calls names of pyparsing that are due to go.
pytestmark = pytest.mark.filterwarnings("ignore::DeprecationWarning")
FT = 12_000.0  # kip*ft in lb*in
E19 = EDITIONS["ACI 318-19"]
SQUARE = Column("C1", 16.0, 20.0, Bars(10, 9, 3, 4), Ties("ties", 3, 14.0), 1.5, 4_000.0, 60_000.0, aggregate=0.75)
ROUND = Column("C2", None, 20.0, Bars(8, 8), Ties("spiral", 4, 2.5), 1.5, 5_000.0, 60_000.0, aggregate=0.75)
RAY = "axial force with bending, on the ray through the load"


# The ratio worked by hand against the surface


class RayPad(FloatPad):
    """A pad of floats that keeps the ratio on the ray and every difference that should vanish."""

    def __init__(self) -> None:
        self.ratios: list[float] = []
        self.differences: list[float] = []

    def verify(self, what: str, demand: float, capacity: float, clause: str) -> float:
        if what.endswith(RAY):
            self.ratios.append(demand / capacity)
        return demand / capacity

    def confirm(self, solved: Sequence[float], by: Sequence[float]) -> None:
        assert solved
        assert by
        self.differences += by


def random_column(rng: random.Random) -> Column:
    size, tied = rng.choice([6, 8, 9, 11, 14]), Ties("ties", 4, 12.0)
    f_c, f_y = rng.choice([2_500.0, 4_000.0, 5_500.0, 8_000.0, 10_000.0]), rng.choice([40_000.0, 60_000.0, 80_000.0])
    h = rng.choice([16.0, 20.0, 24.0, 30.0, 36.0])
    if rng.random() < 0.4:
        ties = Ties("spiral", 4, 2.5) if rng.random() < 0.5 else tied
        return Column("C", None, h, Bars(rng.randint(3, 14), size), ties, 1.5, f_c, f_y)
    n_x, n_y = rng.randint(2, 5), rng.randint(2, 5)
    bars = Bars(2 * (n_x + n_y) - 4, size, n_x, n_y)
    return Column("C", rng.choice([14.0, 18.0, 24.0, 30.0]), h, bars, tied, 1.5, f_c, f_y)


def random_force(rng: random.Random, column: Column, kind: str) -> Force:
    area = column.h * (column.b or column.h)
    P, M = rng.uniform(0.0, 0.6) * area * column.f_c, area * column.h * column.f_c * 0.2
    Mx, My = (rng.uniform(0.02, 1.0) * rng.choice([1, -1]) * M for _ in "xy")
    return {
        "biaxial": Force("a", P, Mx, My),
        "about x": Force("a", P, Mx),
        "about y": Force("a", P, 0.0, My),
        "tension": Force("a", -0.3 * P, Mx, rng.choice([0.0, My])),
        "eccentricity about that of the cap": Force("a", P, Mx * rng.uniform(0.1, 0.3), My * 0.1),
        "small eccentricity": Force("a", P, Mx * 1e-3, My * rng.choice([1e-3, 1e-5])),
        "no axial force": Force("a", 0.0, Mx, My),
    }[kind]


@pytest.mark.parametrize(
    ("kind", "skew"),
    [
        ("biaxial", 20),
        ("about x", 20),
        ("about y", 20),
        ("tension", 20),
        ("no axial force", 20),
        ("eccentricity about that of the cap", 10),
        ("small eccentricity", 0),
    ],
)
def test_the_ratio_worked_by_hand_is_that_of_the_surface(kind: str, skew: int) -> None:
    rng = random.Random(f"evidence, {kind}")
    seen = 0
    for _ in range(60):
        column, edition = random_column(rng), rng.choice(list(EDITIONS.values()))
        force, pad = random_force(rng, column, kind), RayPad()
        work_column(pad, column, [force], Context(edition))
        point = LoadPoint(0, 0, "a", force.P, force.Mx or 0.0, force.My or 0.0)
        surface = Interaction(column, edition, [point])
        # The surface iterates to some 1e-9; most come out to twelve digits.
        assert pad.ratios == [pytest.approx(surface.ratio, rel=1e-8)], (column, force)
        assert surface.capped or pad.differences
        assert max(map(abs, pad.differences), default=0.0) < 1e-7, (column, force)
        seen += not surface.capped
    # How many had a neutral axis.
    assert seen >= skew


def test_of_several_combinations_the_governing_one_is_worked() -> None:
    rng = random.Random("several combinations")
    for _ in range(30):
        column, edition = random_column(rng), rng.choice(list(EDITIONS.values()))
        forces = [replace(random_force(rng, column, "biaxial"), combination=f"c{number}") for number in range(5)]
        pad = RayPad()
        result = work_column(pad, column, forces, Context(edition))[0]
        alone = {one.combination: check(column, [one], Context(edition))[0].ratio or 0.0 for one in forces}
        assert pad.ratios == [pytest.approx(max(alone.values()), rel=1e-8)]
        assert result.combination == max(alone, key=lambda name: alone[name])


# The stress block


def block(column: Column, axes: Axes, a: float, **own: float) -> dict[str, float]:
    """The block of depth `a` by the printed steps."""
    work = ColumnWorking(FloatPad(), column, E19)
    sizes = {} if column.b is None else {"b": column.b}
    v = {"h": column.h, "f_c": column.f_c, "beta_1": 0.8, "c": a / 0.8, **sizes, **own}
    work_block(work, v, axes)
    assert v["a"] == pytest.approx(a)
    return v


def clipped(b: float, h: float, theta: float, a: float) -> Polygon:
    """The part of a rectangle within `a` of its farthest corner along a direction, clipped by a general library."""
    rectangle = box(-b / 2, -h / 2, b / 2, h / 2)
    ux, uy = math.cos(theta), math.sin(theta)
    edge, far = max(x * ux + y * uy for x, y in rectangle.exterior.coords) - a, 1_000.0
    corners = [(edge, -far), (far, -far), (far, far), (edge, far)]
    return rectangle.intersection(Polygon([(s * ux - t * uy, s * uy + t * ux) for s, t in corners]))


def test_a_skew_block_is_what_a_general_library_clips() -> None:
    rng = random.Random("blocks")
    for _ in range(400):
        b, h, theta = rng.uniform(10.0, 40.0), rng.uniform(10.0, 40.0), rng.uniform(-math.pi, math.pi)
        deepest = b * abs(math.cos(theta)) + h * abs(math.sin(theta))
        a = rng.uniform(0.02, 1.2) * deepest
        found = block(replace(SQUARE, b=b, h=h), Axes("", False), a, theta=theta)
        expected = clipped(b, h, theta, a)
        assert found["A_c"] == pytest.approx(expected.area, rel=1e-9)
        assert (found["x_c"], found["y_c"]) == pytest.approx(expected.centroid.coords[0], abs=1e-8)
        assert found["C_c"] == pytest.approx(0.85 * 4_000.0 * expected.area, rel=1e-9)


@pytest.mark.parametrize("turn", [0.0, 0.5, 1.0, -0.5, -1.0, 0.25])
@pytest.mark.parametrize("a", [1.0, 8.0, 16.0, 19.999, 20.0, 28.2, 30.0])
def test_a_block_square_to_a_face_or_a_diagonal(turn: float, a: float) -> None:
    # theta along an axis, to the last digit of pi; and along the diagonal of a square, through its corners.
    theta = turn * math.pi
    for b, h in ((16.0, 20.0), (20.0, 20.0)):
        found = block(replace(SQUARE, b=b, h=h), Axes("", False), a, theta=theta)
        expected = clipped(b, h, theta, a)
        assert found["A_c"] == pytest.approx(expected.area, rel=1e-9)
        assert (found["x_c"], found["y_c"]) == pytest.approx(expected.centroid.coords[0], abs=1e-8)


def test_an_edge_through_a_corner_leaves_no_vertex_out() -> None:
    # 3-4-5: with u = (0.6, 0.8) the corners of 16 by 12 in lie at 9.6, 0, 0 and -9.6 in: two on the edge for a = 9.6.
    column = replace(SQUARE, b=16.0, h=12.0)
    theta = math.atan2(0.8, 0.6)
    found = block(column, Axes("", False), 9.6, theta=theta)
    assert found["A_c"] == pytest.approx(96.0)
    # A triangle of two sides of the rectangle: its centroid is a third from its right angle.
    assert (found["x_c"], found["y_c"]) == pytest.approx((8.0 - 16.0 / 3, 6.0 - 12.0 / 3))


@pytest.mark.parametrize("sign", [1.0, -1.0])
@pytest.mark.parametrize("a", [0.5, 8.0, 15.9, 16.0, 20.0, 22.0])
def test_a_block_of_bending_about_one_axis(sign: float, a: float) -> None:
    about_x = block(SQUARE, Axes("x", False), a, M_ux=sign * 5.0)
    expected = clipped(16.0, 20.0, sign * math.pi / 2, a)
    assert about_x["A_c"] == pytest.approx(expected.area, rel=1e-12)
    assert about_x["y_c"] == pytest.approx(expected.centroid.y, abs=1e-9)
    about_y = block(SQUARE, Axes("y", False), a, M_uy=sign * 5.0)
    expected = clipped(16.0, 20.0, 0.0 if sign > 0 else math.pi, a)
    assert about_y["A_c"] == pytest.approx(expected.area, rel=1e-12)
    assert about_y["x_c"] == pytest.approx(expected.centroid.x, abs=1e-9)


def segment(h: float, a: float) -> tuple[float, float]:
    """Area of a segment of a circle and the distance of its centroid from the centre, by numerical integration."""
    R, low = h / 2, max(h / 2 - a, -h / 2)
    # t = R cos(w) takes the root out of the ends.
    top = math.acos(low / R)
    area = quad(lambda w: 2 * (R * math.sin(w)) ** 2, 0, top, epsrel=1e-12)[0]
    first = quad(lambda w: 2 * R * math.cos(w) * (R * math.sin(w)) ** 2, 0, top, epsrel=1e-12)[0]
    return area, first / area


@pytest.mark.parametrize("a", [0.1, 2.0, 9.99, 10.0, 10.01, 17.0, 20.0, 25.0])
def test_a_block_in_a_circle_by_numerical_integration(a: float) -> None:
    area, arm = segment(20.0, a)
    for theta in (0.3, 2.0, -1.2, math.pi):
        found = block(ROUND, Axes("", True), a, theta=theta)
        assert found["A_c"] == pytest.approx(area, rel=1e-9)
        assert found["x_c"] == pytest.approx(arm * math.cos(theta), abs=1e-8)
        assert found["y_c"] == pytest.approx(arm * math.sin(theta), abs=1e-8)
    for sign in (1.0, -1.0):
        assert block(ROUND, Axes("x", True), a, M_ux=sign)["y_c"] == pytest.approx(sign * arm, abs=1e-8)
        assert block(ROUND, Axes("y", True), a, M_uy=sign)["x_c"] == pytest.approx(sign * arm, abs=1e-8)


@pytest.mark.parametrize(
    ("column", "Mx", "My", "name"),
    [
        (SQUARE, 5.0, 0.0, "x"),
        (SQUARE, 0.0, -5.0, "y"),
        (SQUARE, 5.0, 1e-9, ""),
        (ROUND, -5.0, 0.0, "x"),
        (ROUND, 0.0, 5.0, "y"),
        # Bars on a circle are symmetric about x however many they are: the first stands on x. About y only if even.
        (replace(ROUND, bars=Bars(7, 8)), 0.0, 5.0, "y"),
        (replace(ROUND, bars=Bars(7, 8)), 5.0, 0.0, ""),
    ],
)
def test_about_which_axes_a_load_bends(column: Column, Mx: float, My: float, name: str) -> None:
    assert bending_axes(column, Mx, My) == Axes(name, column.b is None)


# The paths of the procedure


def worked(pad: Any, column: Column, forces: Sequence[Force], edition: Edition = E19) -> Any:
    work_column(pad, column, forces, Context(edition))
    return pad


def of_ray(pad: Any) -> list[Any]:
    return [verdict for verdict in pad.verdicts if verdict.what.endswith(RAY)]


def test_where_the_maximum_axial_strength_governs_no_axis_is_found(steps: Any, each: Edition) -> None:
    worked(steps, SQUARE, [Force("a", 500_000.0, 1_000.0, 2_000.0)], each)
    # Hand: 0.52 (0.85 * 4 * (320 - 10) + 60 * 10) = 860.08 kip.
    (verdict,) = of_ray(steps)
    assert (verdict.demand, verdict.capacity) == (500_000.0, pytest.approx(860_080.0))
    assert steps.solutions == []
    assert "On this ray the maximum axial strength governs; no neutral axis is needed." in steps.reasons
    assert steps.under("Axial force with bending")[-1] == ("figure", "")


@pytest.mark.parametrize(("Mx", "My"), [(0.0, 0.0), (1e-12, 0.0), (0.0, -1e-9), (1e-10, 1e-10)])
def test_tension_alone_is_held_against_the_bars(Mx: float, My: float, steps: Any, each: Edition) -> None:
    # Moments that are noise of a combination are none. Hand: 0.9 * 60 * 10 = 540 kip.
    worked(steps, SQUARE, [Force("uplift", -270_000.0, Mx, My)], each)
    (verdict,) = of_ray(steps)
    assert (verdict.demand, verdict.capacity) == (270_000.0, pytest.approx(540_000.0))
    assert steps.solutions == []
    assert (verdict.clause, verdict.what) == ("22.4.3.1", "C1: " + RAY)


def test_without_forces_the_strengths_are_stated(steps: Any, each: Edition) -> None:
    result = work_column(steps, SQUARE, [], Context(each))[0]
    assert (result.ratio, result.verdict) == (None, "")
    assert of_ray(steps) == []
    assert steps.under("Axial force with bending") == [
        ("reason", "No factored forces listed for this column: the strengths alone are stated.")
    ]


def test_a_force_of_zero_acts_on_nothing(steps: Any, each: Edition) -> None:
    result = work_column(steps, SQUARE, [Force("nothing", 0.0)], Context(each))[0]
    assert (result.ratio, result.verdict) == (0.0, "OK")
    assert of_ray(steps) == []
    assert "No force acts on the section." in steps.reasons


@pytest.mark.parametrize(("Mx", "My"), [(80.0 * FT, 0.0), (-80.0 * FT, 0.0), (0.0, 80.0 * FT), (0.0, -80.0 * FT)])
def test_even_bars_on_a_circle_bend_about_one_axis(Mx: float, My: float, steps: Any) -> None:
    worked(steps, ROUND, [Force("a", 200_000.0, Mx, My)])
    assert [one.symbol for one in steps.solutions] == ["c"]
    moment = steps.values["M_nx" if Mx else "M_ny"]
    assert math.copysign(1.0, moment) == math.copysign(1.0, Mx + My)
    assert of_ray(steps)[0].ratio == pytest.approx(check(ROUND, [Force("a", 200e3, 80.0 * FT)], Context(E19))[0].ratio)


def test_odd_bars_on_a_circle_turn_the_neutral_axis(steps: Any) -> None:
    odd = replace(ROUND, bars=Bars(7, 8))
    worked(steps, odd, [Force("a", 200_000.0, 80.0 * FT)])
    assert [one.symbol for one in steps.solutions] == ["theta", "c"]
    assert steps.values["theta"] != pytest.approx(math.pi / 2, abs=1e-4)
    # The strength has no moment about y, as the load has none.
    assert steps.values["M_ny"] == pytest.approx(0.0, abs=1e-6 * steps.values["M_nx"])


def test_odd_bars_on_a_circle_bend_about_y_alone(recording: Any) -> None:
    odd = replace(ROUND, bars=Bars(7, 8))
    # The first bar stands on +x: in tension it counts more, so the sign of the moment makes a difference.
    ratios = [of_ray(worked(recording(), odd, [Force("a", 60e3, 0.0, sign * 120.0 * FT)]))[0].ratio for sign in (1, -1)]
    assert ratios[0] != pytest.approx(ratios[1], rel=1e-3)
    pad = worked(recording(), odd, [Force("a", 60e3, 0.0, 120.0 * FT)])
    assert [one.symbol for one in pad.solutions] == ["c"]


def test_bars_on_the_edge_of_the_block_turn_the_neutral_axis(steps: Any) -> None:
    # Regression: bending about x alone, a row of five bars on the edge of the block. With all inside or none, the
    # axial forces do not balance; an axis turned by a degree, with some inside, does, and is the smallest strength.
    row_of_five = Column("C", 14.0, 20.0, Bars(16, 9, 5, 5), Ties("ties", 4, 12.0), 1.5, 10_000.0, 40_000.0)
    result = work_column(steps, row_of_five, [Force("a", 0.0, -80.0 * FT)], Context(E19))[0]
    assert [one.symbol for one in steps.solutions] == ["theta", "c"]
    assert 0.001 < abs(math.cos(steps.values["theta"])) < 0.1
    assert of_ray(steps)[0].ratio == pytest.approx(result.ratio, rel=1e-8)
    assert steps.values["M_ny"] == pytest.approx(0.0, abs=1e-8 * abs(steps.values["M_nx"]))
    (bars,) = [one.made.rows for one in steps.tables if one.table.title.startswith("Bars")]
    assert {row["d_s"] < steps.values["a"] for row in bars if row["y"] == min(one["y"] for one in bars)} == {
        True,
        False,
    }


@pytest.mark.parametrize(
    ("theta", "name", "fits"),
    [
        (math.pi / 2, "x", True),
        (-math.pi / 2, "x", True),
        (math.pi / 2 + 1e-5, "x", False),
        (0.0, "x", False),
        (0.0, "y", True),
        (-math.pi, "y", True),
        (1e-5, "y", False),
        (0.7, "", True),
    ],
)
def test_whether_an_axis_is_parallel_to_that_of_bending(theta: float, name: str, fits: bool) -> None:
    assert NeutralAxis(theta, 5.0).fits(Axes(name, False)) is fits


SLENDER = replace(SQUARE, b=20.0, bars=Bars(8, 9, 3, 3), l_u=360.0, frame="nonsway", beta_dns=0.5)


def test_where_the_least_moments_govern_two_load_points_are_made(steps: Any, each: Edition) -> None:
    result = work_column(steps, SLENDER, [Force("a", 400_000.0, 5.0 * FT, 4.0 * FT)], Context(each))[0]
    assert "The least moments act about one axis at a time: two load points." in steps.reasons
    (verdict,) = of_ray(steps)
    assert verdict.ratio == pytest.approx(result.ratio, rel=1e-8)
    # Hand: P (0.6 + 0.03 h) = 400 * 1.2 = 480 kip*in; E_c I_g = 3,605 * 13,333 = 48.07e6 kip*in^2, 0.4/1.5 of it
    # 12.82e6; P_c = 9.870 * 12.82e6/360^2 = 976 kip; the magnifier 1/(1 - 400/732) = 2.205, so 88.2 kip*ft. About the
    # other axis the end moment is magnified, 2.205 * 4 = 8.8 kip*ft where the least one is about x.
    M_ux, M_uy = (result.values[symbol][0] or 0.0 for symbol in ("M_ux", "M_uy"))
    assert steps.values["M_2_min"] == pytest.approx(480_000.0)
    assert max(M_ux, M_uy) == pytest.approx(88.2, rel=2e-3)
    assert min(M_ux, M_uy) == pytest.approx(2.205 * (5.0 if M_ux < M_uy else 4.0), rel=2e-3)
    assert [one.symbol for one in steps.solutions] == ["theta", "c", "c", "c"]


def test_a_magnified_moment_is_what_the_axis_was_found_from(steps: Any, each: Edition) -> None:
    result = work_column(steps, SLENDER, [Force("a", 400_000.0, 100.0 * FT)], Context(each))[0]
    M_c = (result.values["M_ux"][0] or 0.0) * FT
    assert M_c > 100.0 * FT
    (solved, *_) = steps.solutions
    assert M_c == pytest.approx(max(value for value in solved.solved_from if value < 1e7))


# The reciprocal load

BIAXIAL = Force("a", 300_000.0, 90.0 * FT, 60.0 * FT)
TITLE = "Independent check: reciprocal load"


def test_the_reciprocal_load_from_strengths_about_each_axis(steps: Any, each: Edition) -> None:
    worked(steps, SQUARE, [BIAXIAL], each)
    nominal = Surface(Interaction(SQUARE, each, []).surface.section, NOMINAL)
    P_nx, P_ny = (float(nominal.check([300e3], [Mx], [My]).P_n[0]) for Mx, My in ((90 * FT, 0.0), (0.0, 60 * FT)))
    # Hand: P_o = 0.85 * 4 * 310 + 60 * 10 = 1,654 kip.
    by_hand = 1 / (1 / P_nx + 1 / P_ny - 1 / 1_654_000.0)
    assert steps.values["P_n_recip"] == pytest.approx(by_hand)
    assert abs(steps.values["Delta_recip"]) < BAND
    assert any(text.startswith("Within its band of 10 %") for text in steps.reasons)
    assert [one.symbol for one in steps.solutions] == ["theta", "c", "c", "c"]


def test_eccentricities_of_the_strengths_are_those_of_the_load(steps: Any) -> None:
    worked(steps, SQUARE, [BIAXIAL])
    found = [one.made.rows[0] for one in steps.tables if one.table.title.startswith("Eccentricity")]
    # Hand: 90 * 12/300 = 3.6 in along y, 60 * 12/300 = 2.4 in along x.
    assert [row["e_n"] for row in found] == pytest.approx([3.6, 2.4])
    assert steps.values["e_y"] == pytest.approx(3.6)
    assert steps.values["e_x"] == pytest.approx(2.4)


def test_outside_its_band_the_sheet_says_what_to_look_at(steps: Any) -> None:
    # Strong concrete with few bars, both eccentricities large: the reciprocal load is 15 % above.
    strong = replace(SQUARE, h=24.0, f_c=10_000.0, bars=Bars(6, 11, 2, 3), ties=Ties("ties", 4, 12.0))
    worked(steps, strong, [Force("a", 1_476_875.0, 13_759_388.0, 11_396_886.0)])
    assert steps.values["Delta_recip"] > BAND
    assert any(text.startswith("Outside its band of 10 %") for text in steps.reasons)
    assert not any(text.startswith("Within its band") for text in steps.reasons)


@pytest.mark.parametrize(
    ("force", "why"),
    [
        # Hand: 0.1 f'c A_g = 128 kip.
        (Force("a", 40_000.0, 150.0 * FT, 100.0 * FT), "Not used: with one of the eccentricities alone"),
        (Force("a", 300_000.0, 200.0 * FT, 1e-12), "Not used: one of the eccentricities is so small"),
    ],
)
def test_where_the_reciprocal_load_is_not_meant_the_sheet_says_so(force: Force, why: str, steps: Any) -> None:
    worked(steps, SQUARE, [force])
    under = steps.under(TITLE)
    assert under[:2] == [("worked", "A_g"), ("worked", "P_n_least")]
    assert under[-1][1].startswith(why)
    assert "P_n_recip" not in steps.values


def test_where_an_axis_alone_is_turned_the_reciprocal_load_is_not_used(steps: Any) -> None:
    # Regression: with 2.4 in along y alone, a row of four bars stands on the edge of the block.
    column = replace(SQUARE, h=24.0, bars=Bars(12, 11, 4, 4), ties=Ties("ties", 4, 12.0))
    worked(steps, column, [Force("a", 500e3, 1.2e6, 2.0e6)])
    assert steps.under(TITLE)[-1][1].startswith("Not used: bars on the edge of the block turn the neutral axis")
    assert "P_n_recip" not in steps.values


@pytest.mark.parametrize(
    ("column", "force"),
    [
        (ROUND, BIAXIAL),
        (SQUARE, replace(BIAXIAL, My=0.0)),
        (SQUARE, replace(BIAXIAL, Mx=0.0)),
        (SQUARE, replace(BIAXIAL, P=0.0)),
        (SQUARE, replace(BIAXIAL, P=-50_000.0)),
        (SQUARE, Force("a", 600_000.0)),
    ],
)
def test_where_there_is_nothing_to_compare_it_is_left_out(column: Column, force: Force, steps: Any) -> None:
    worked(steps, column, [force])
    assert TITLE not in steps.told("heading")


def test_layers_come_to_what_the_bars_come_to() -> None:
    # The same neutral axis with bars one by one and in layers.
    from calcpack.members.bar_layout import layer_rows

    for axes, point in ((Axes("x", False), {"M_ux": 1e6}), (Axes("y", False), {"M_uy": -1e6})):
        found = []
        for layered in (False, True):
            work = ColumnWorking(FloatPad(), SQUARE, E19)
            rows = layer_rows(work, axes.name) if layered else ()
            found.append(work_strength(work, NeutralAxis(0.0, 9.0), axes, {"P_u": 1e5, **point}, rows).values)
        moment = "M_nx" if axes.name == "x" else "M_ny"
        for symbol in ("P_n", moment):
            assert found[0][symbol] == pytest.approx(found[1][symbol], rel=1e-12)


# On a sheet

COLUMNS = """mark,shape,b [in],h [in],bars,ties,cover [in],f_c [psi],f_y [psi],source
C1,rectangular,16,20,10-#9 (3x4),#3@14,1.5,4000,60000,S-401
C2,circular,,20,7-#8,#4 spiral@2.5,1.5,5000,60000,S-402
C3,rectangular,20,16,8-#9 (3x3),#3@14,1.5,4000,80000,S-401
"""
FORCES = """mark,combination,P [kip],Mx [kip*ft],My [kip*ft]
C1,1.2D+1.6L,300,90,60
C1,0.9D+1.0W,40,30,-20
C2,1.2D+1.6L,200,80,0
C3,1.2D+1.6L,150,0,-90
"""
MARKS = ("C1", "C2", "C3")


@pytest.fixture(autouse=True)
def shown(monkeypatch: pytest.MonkeyPatch) -> Shown:
    return Shown(monkeypatch)


def sheet_of(folder: Path, forces: str = FORCES, marks: Sequence[str] = MARKS) -> Sheet:
    sheet = Sheet("C-01", "Columns", job=make_job(folder, columns=COLUMNS, forces=forces))
    for mark in marks:
        sheet.column(mark)
    return sheet


def solved(sheet: Sheet) -> list[Entry]:
    return [entry for entry in sheet.ledger if entry.kind == "solved"]


def test_the_ledger_replays_and_confirms_what_was_solved(tmp_path: Path) -> None:
    sheet = sheet_of(tmp_path / "job")
    done = replay(entry.to_json() for entry in sheet.ledger)
    assert [item for item in done if not item.agrees] == []
    found = solved(sheet)
    # By name: the axis of C1, its two of the reciprocal load, that of C2 with its direction, that of C3.
    assert [entry.symbol for entry in found] == ["theta", "c", "c", "c", "theta", "c", "c"]
    confirming = [item for item in done if item.what.startswith("confirmed by")]
    assert {item.id for item in confirming} == {entry.id for entry in found}
    for entry in found:
        assert entry.confirmed_by
        assert all(entry.id in sheet.ledger.below(identifier) for identifier in entry.confirmed_by)
        assert all(abs(sheet.ledger[identifier].value) < 1e-7 for identifier in entry.confirmed_by)


def test_verdicts_on_the_ray_are_those_of_the_check(tmp_path: Path) -> None:
    sheet = sheet_of(tmp_path / "job")
    results = {one.mark: one for one in check_members(load(sheet._root)).results if one.check == "axial and bending"}
    found = {entry.means[:2]: entry for entry in sheet.ledger if entry.kind == "verdict" and entry.means.endswith(RAY)}
    assert list(found) == list(MARKS)
    for mark, entry in found.items():
        assert entry.ratio == pytest.approx(results[mark].ratio, rel=1e-8)
        assert entry.verdict == results[mark].verdict
    # A verdict rests on the neutral axis, and that on the forces.
    below = {sheet.ledger[identifier].symbol for identifier in sheet.ledger.below(found["C1"].id)}
    assert {"theta", "c", "P_u", "M_ux", "M_uy", "f_c", "A_b", "phi", "eps_t"} <= below


def digests(sheet: Sheet) -> list[str]:
    return [sheet.ledger.hash(entry.id) for entry in solved(sheet)]


def test_the_neutral_axis_is_another_where_a_force_is_another(tmp_path: Path) -> None:
    first = sheet_of(tmp_path / "a", marks=["C1"])
    # Another length on the same ray: the axes stand where they stood, and rest on other forces.
    along = sheet_of(tmp_path / "b", FORCES.replace("300,90,60", "330,99,66"), marks=["C1"])
    before, after = ([entry.value for entry in solved(sheet)] for sheet in (first, along))
    assert after == pytest.approx(before, rel=1e-7)
    assert len(after) == 4
    assert all(one != other for one, other in zip(digests(first), digests(along), strict=True))


def test_a_force_that_does_not_govern_changes_no_neutral_axis(tmp_path: Path) -> None:
    other = sheet_of(tmp_path / "b", FORCES.replace("40,30,-20", "44,30,-20"), marks=["C1"])
    assert digests(other) == digests(sheet_of(tmp_path / "a", marks=["C1"]))


@pytest.mark.parametrize("off", [1 + 1e-4, 1 - 1e-4])
@pytest.mark.parametrize("mark", MARKS)
def test_an_axis_that_is_slightly_off_is_refused(
    mark: str, off: float, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    found = Interaction.neutral_axis
    assert isinstance(found, property)
    assert found.fget is not None
    true = found.fget
    monkeypatch.setattr(Interaction, "neutral_axis", property(lambda self: (true(self)[0], off * true(self)[1])))
    with pytest.raises(SheetError, match=r"(?s)confirm.*a ratio of at most 1e-06: solve it again"):
        sheet_of(tmp_path / "job", marks=[mark])


def test_a_direction_that_is_slightly_off_is_refused(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    found = Interaction.neutral_axis
    assert isinstance(found, property)
    assert found.fget is not None
    true = found.fget
    monkeypatch.setattr(Interaction, "neutral_axis", property(lambda self: (true(self)[0] + 1e-4, true(self)[1])))
    with pytest.raises(SheetError, match=r"(?s)confirm.*a ratio of at most 1e-06: solve it again"):
        sheet_of(tmp_path / "job", marks=["C1"])


# A check by hand, from what is printed alone


def printed(item: dict[str, Any]) -> list[dict[str, float]]:
    """The numbers of a table as they stand on the page, by column."""
    symbols = [column["symbol"] for column in item["columns"]]
    return [
        {name: parse_number(cell["text"]) for name, cell in zip(symbols, row["cells"], strict=True) if cell}
        for row in item["rows"]
    ]


def totals(item: dict[str, Any]) -> dict[str, tuple[float, float]]:
    """The sums below a table, each with one of its last place."""
    return {cell["symbol"]: number(cell["text"]) for cell in item["totals"] if cell}


def number(text: str) -> tuple[float, float]:
    return parse_number(text.split(" ")[0]), last_place(text.split(" ")[0])


@pytest.mark.parametrize("mark", MARKS)
def test_a_hand_reworks_the_bars_from_the_printed_table(mark: str, tmp_path: Path, shown: Shown) -> None:
    sheet = sheet_of(tmp_path / "job", marks=[mark])
    (table,) = [item for item in shown.of("tabulated") if item["title"] == "Bars at the neutral axis"]
    (row,) = [one for one in load_columns(sheet) if one.mark == mark]
    rows, sums = printed(table), totals(table)
    c, f_y, f_c = (sheet.values(symbol)[0].entry.value for symbol in ("c", "f_y", "f_c"))
    a, A_b = sheet.values("a")[0].entry.value, BARS[row.bars.size].A_b
    assert len(rows) == row.bars.count
    for one in rows:
        # Plane sections; elastic to the yield strength; less 0.85 f'c where the centre lies inside the block.
        assert one["eps_s"] == pytest.approx(0.003 * (c - one["d_s"]) / c, abs=2e-7)
        assert one["f_s"] == pytest.approx(max(-f_y, min(f_y, 29e6 * one["eps_s"])) / 1000, abs=0.012)
        lost = 0.85 * f_c / 1000 if one["d_s"] < a else 0.0
        assert one["F_s"] == pytest.approx(A_b * (one["f_s"] - lost), abs=0.012)
        # Force in kip, arms in inches, moments in kip*ft.
        for moment, arm in (("M_Fx", "y"), ("M_Fy", "x")):
            if moment in one:
                assert one[moment] == pytest.approx(one["F_s"] * one[arm] / 12, abs=0.012)
    for symbol, (total, last) in sums.items():
        column = symbol.removesuffix("_sum")
        assert abs(sum(one[column] for one in rows) - total) <= 1.01 * last


def load_columns(sheet: Sheet) -> tuple[Any, ...]:
    from calcpack.job import read_columns

    return read_columns(sheet._root)


def test_a_hand_reworks_the_sums_from_the_printed_table(tmp_path: Path, shown: Shown) -> None:
    sheet = sheet_of(tmp_path / "job", marks=["C1"])
    (table,) = [item for item in shown.of("tabulated") if item["title"] == "Bars at the neutral axis"]
    sums = {symbol: total for symbol, (total, _) in totals(table).items()}
    shown_of = {symbol: sheet.values(symbol)[0].entry.shown for symbol in ("C_c", "x_c", "y_c", "P_n", "M_nx", "M_ny")}
    assert [shown_of[symbol].split(" ")[1] for symbol in ("C_c", "y_c", "P_n", "M_nx")] == [
        "kip",
        "in",
        "kip",
        "kip·ft",
    ]
    C_c, x_c, y_c = (number(shown_of[symbol])[0] for symbol in ("C_c", "x_c", "y_c"))
    by_hand = {
        "P_n": C_c + sums["F_s_sum"],
        "M_nx": C_c * y_c / 12 + sums["M_Fx_sum"],
        "M_ny": C_c * x_c / 12 + sums["M_Fy_sum"],
    }
    for symbol, found in by_hand.items():
        stated, last = number(shown_of[symbol])
        assert abs(found - stated) <= 1.01 * last, symbol


def test_a_hand_reworks_the_block_from_its_printed_vertices(tmp_path: Path, shown: Shown) -> None:
    sheet = sheet_of(tmp_path / "job", marks=["C1"])
    (table,) = [item for item in shown.of("tabulated") if item["title"].startswith("Vertices of the block")]
    corners = [(one["x"], one["y"]) for one in printed(table)]
    assert corners[0] == corners[-1]
    polygon = Polygon(corners)
    assert polygon.exterior.is_ccw
    assert sheet.values("A_c")[0].entry.value == pytest.approx(polygon.area, rel=1e-4)
    assert [sheet.values(symbol)[0].entry.value for symbol in ("x_c", "y_c")] == pytest.approx(
        polygon.centroid.coords[0], abs=1e-3
    )
    # Every vertex that is no corner of the section lies on the edge of the block, at q along u.
    u_x, u_y, q = (sheet.values(symbol)[0].entry.value for symbol in ("u_x", "u_y", "q"))
    off = [u_x * x + u_y * y - q for x, y in corners if (abs(x), abs(y)) != (8.0, 10.0)]
    assert len(off) >= 2
    assert off == pytest.approx([0.0] * len(off), abs=2e-4)


def test_the_printed_differences_vanish(tmp_path: Path, shown: Shown) -> None:
    sheet_of(tmp_path / "job", marks=["C1"])
    found = [item for item in shown.of("tabulated") if any(column["symbol"] == "Delta" for column in item["columns"])]
    assert len(found) == 3
    for item in found:
        assert [row["Delta"] for row in printed(item)] == [0.0] * len(item["rows"])
    (parts,) = [item for item in found if item["title"] == "Load against strength, part by part"]
    assert [row["label"] for row in parts["rows"]] == ["P", "M about x, over h", "M about y, over b"]


def test_what_is_confirmed_is_said_below_it(tmp_path: Path, shown: Shown) -> None:
    sheet_of(tmp_path / "job", marks=["C2"])
    (said,) = [item for item in shown.of("note") if item.get("confirms")]
    assert "".join(part["text"] for part in said["parts"]) == "theta, c confirmed: the differences vanish."
    assert [identifier for identifier, _ in said["confirms"]] == ["C-01/theta", "C-01/c"]
    given = {item["symbol"]: item["source"] for item in shown.of("given")}
    assert given["c"] == "equilibrium by Newton's method; confirmed below"


def test_figures_show_the_section_and_the_load(tmp_path: Path, shown: Shown) -> None:
    sheet_of(tmp_path / "job", marks=["C1"])
    section, charts = shown.of("figure")
    (c,) = [item["shown"] for item in shown.of("given") if item["symbol"] == "c"][:1]
    assert f"c = {float(c.split(' ')[0]):.2f} in" in section["alt"]
    assert all(item["svg"].startswith("<svg") and item["caption"] for item in (section, charts))
