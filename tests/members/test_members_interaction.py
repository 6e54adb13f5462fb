"""Axial force with bending, from the schedule: where the bars stand, which loads count, and the ratio."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import replace

import pytest

from calcpack.aci318.editions import Edition
from calcpack.errors import RangeError
from calcpack.members.bar_layout import bar_positions, bar_rows, layer_rows
from calcpack.members.column import Context, check
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_section import Bars, Column, Force, Ties
from calcpack.members.interaction import Interaction, LoadPoint, end_points
from calcpack.members.pad import FloatPad
from calcpack.members.results import CheckResult
from calcpack.tabulation import Column as Printed
from calcpack.tabulation import Tabulation

FT = 12_000.0  # kip*ft in lb*in
SQUARE = Column("C1", 16.0, 16.0, Bars(8, 9, 3, 3), Ties("ties", 3, 14.0), 1.5, 4_000.0, 60_000.0)
ROUND = Column("C2", None, 20.0, Bars(8, 8), Ties("spiral", 4, 2.5), 1.5, 5_000.0, 60_000.0)


# Forces with moments by their ends, as forces.csv may give them.
ENDED = Force("1.2D+1.6L", 100_000.0, Mx=None, Mx_bottom=10.0 * FT, Mx_top=-40.0 * FT)


def axial_and_bending(column: Column, forces: Sequence[Force], edition: Edition) -> CheckResult:
    """The check in bulk that stands first among those of a column."""
    result = check(column, forces, Context(edition))[0]
    assert (result.check, result.clause) == ("axial and bending", "22.4")
    return result


def test_bars_of_a_rectangle_stand_evenly_along_its_faces() -> None:
    # Hand: 1.5 + 0.375 + 1.128/2 = 2.439 in from the face, 5.561 in from the centre.
    found = sorted((round(x, 3), round(y, 3)) for x, y in bar_positions(SQUARE))
    assert found == sorted((x, y) for x in (-5.561, 0.0, 5.561) for y in (-5.561, 0.0, 5.561) if x or y)


def test_corner_bars_are_counted_once() -> None:
    wide = replace(SQUARE, b=24.0, bars=Bars(10, 9, 5, 2))
    places = bar_positions(wide)
    assert len(places) == len(set(places)) == 10
    assert {round(abs(y), 3) for _, y in places} == {5.561}
    # Hand: five along x, 2 * 9.561 / 4 = 4.7805 in apart.
    assert sorted({round(x, 4) for x, _ in places}) == [-9.561, -4.7805, 0.0, 4.7805, 9.561]


def test_the_first_bar_of_a_circle_is_on_the_x_axis() -> None:
    # Hand: 10 - 1.5 - 0.5 - 0.5 = 7.5 in from the centre.
    places = bar_positions(ROUND)
    assert places[0] == pytest.approx((7.5, 0.0))
    assert places[2] == pytest.approx((0.0, 7.5))
    assert all(math.hypot(*place) == pytest.approx(7.5) for place in places)


@pytest.mark.parametrize(
    ("count", "layout"), [(8, (3, 3)), (4, (2, 2)), (10, (5, 2)), (10, (2, 5)), (14, (5, 4)), (11, None), (3, None)]
)
def test_rows_of_a_table_of_bars_stand_where_the_bars_do(
    count: int, layout: tuple[int, int] | None, each: Edition
) -> None:
    column = replace(SQUARE, h=24.0, bars=Bars(count, 9, *layout)) if layout else replace(ROUND, bars=Bars(count, 8))
    table = Tabulation("Bars", "bar", (), (Printed("x", 4), Printed("y", 4)))
    made = FloatPad().tabulate(table, bar_rows(ColumnWorking(FloatPad(), column, each)), {})
    assert [(values["x"], values["y"]) for values in made.rows] == [
        pytest.approx(place, abs=1e-12) for place in bar_positions(column)
    ]


@pytest.mark.parametrize(("axis", "across"), [("x", "y"), ("y", "x")])
def test_layers_hold_every_bar_once(axis: str, across: str, each: Edition) -> None:
    column = replace(SQUARE, h=24.0, bars=Bars(14, 9, 5, 4))
    table = Tabulation("Layers", "layer", (), (Printed(across, 4), Printed("A_b", 2)))
    made = FloatPad().tabulate(table, layer_rows(ColumnWorking(FloatPad(), column, each), axis), {})
    # By hand: along y four layers of 5, 2, 2 and 5 bars; along x five of 4, 2, 2, 2 and 4.
    assert [values["A_b"] for values in made.rows] == (
        [5.0, 2.0, 2.0, 5.0] if axis == "x" else [4.0, 2.0, 2.0, 2.0, 4.0]
    )
    places = sorted({round(x if axis == "y" else y, 9) for x, y in bar_positions(column)})
    assert [values[across] for values in made.rows] == pytest.approx(places)


@pytest.mark.parametrize(
    ("force", "expected"),
    [
        (ENDED, [(10.0, 0.0), (-40.0, 0.0)]),
        (Force("a", 100_000.0, 5.0 * FT, 7.0 * FT), [(5.0, 7.0)]),
        # A single moment acts with each end of the other one.
        (replace(ENDED, My=7.0 * FT), [(10.0, 7.0), (-40.0, 7.0)]),
        (replace(ENDED, My=None, My_bottom=1.0 * FT, My_top=2.0 * FT), [(10.0, 1.0), (-40.0, 2.0)]),
        (Force("a", 100_000.0, 5.0 * FT, None, My_bottom=1.0 * FT, My_top=2.0 * FT), [(5.0, 1.0), (5.0, 2.0)]),
    ],
)
def test_load_points_of_a_force(force: Force, expected: list[tuple[float, float]]) -> None:
    found = list(end_points([Force("first", 1.0), force]))
    assert found[0] == LoadPoint(0, 0, "first", 1.0, 0.0, 0.0)
    assert [(one.Mx / FT, one.My / FT) for one in found[1:]] == expected
    assert [(one.force, one.place, one.name, one.P) for one in found[1:]] == [
        (1, place, force.combination, force.P) for place in range(len(expected))
    ]


def test_moments_by_their_ends_make_two_load_points(each: Edition) -> None:
    # The larger end governs, with its sign; it is the ratio of that moment alone.
    result = axial_and_bending(SQUARE, [ENDED], each)
    assert result.values["M_ux"] == (-40.0, "kip*ft")
    assert result.ratio == axial_and_bending(SQUARE, [Force("top", 100_000.0, -40.0 * FT)], each).ratio
    turned = replace(ENDED, Mx_bottom=-40.0 * FT, Mx_top=10.0 * FT)
    assert axial_and_bending(SQUARE, [turned], each) == result


def test_unfactored_rows_are_no_load_points(each: Edition) -> None:
    result = axial_and_bending(SQUARE, [replace(ENDED, combination=None)], each)
    assert (result.ratio, result.verdict) == (None, "")


def test_a_load_that_is_no_number_is_refused(each: Edition) -> None:
    with pytest.raises(RangeError, match="nan"):
        axial_and_bending(SQUARE, [Force("a", 1_000.0, float("nan"))], each)


def test_the_governing_point_is_known_with_its_force_and_place(each: Edition) -> None:
    points = [
        LoadPoint(number, place, f"c{number}", 1e5, share * 1e5, 0.0)
        for number, place, share in ((0, 0, 1.0), (0, 1, 3.0), (1, 0, 9.0), (1, 1, 5.0), (2, 0, 8.0))
    ]
    found = Interaction(SQUARE, each, points)
    assert found.governing == points[2]
    assert found.result().combination == "c1"
    assert found.ratio == max(float(ratio) for ratio in found.checked.ratio)
    assert not found.capped
    assert Interaction(SQUARE, each, [LoadPoint(0, 0, "a", 1e5, 1e3, 0.0)]).capped


def test_compression_alone_is_held_against_the_maximum_axial_strength(each: Edition) -> None:
    # Hand: 0.65 * 0.80 * (0.85 * 4 * 248 + 480) = 688.064 kip.
    result = axial_and_bending(SQUARE, [Force("a", 300_000.0), Force("b", 434_000.0)], each)
    assert (result.combination, result.verdict) == ("b", "OK")
    assert result.ratio == pytest.approx(434.0 / 688.064)
    assert result.values["phi_P_n_max"] == (pytest.approx(688.064), "kip")
    assert result.values["P_o"] == (pytest.approx(1323.2), "kip")


@pytest.mark.parametrize("column", [SQUARE, ROUND])
def test_axial_strengths_are_those_of_the_printed_equations(column: Column, each: Edition) -> None:
    bending, axial, *_ = check(column, [Force("a", 1_000.0)], Context(each))
    assert axial.check == "axial strength"
    for symbol in ("P_o", "phi_P_n_max"):
        assert bending.values[symbol] == (pytest.approx(axial.values[symbol][0]), "kip")


def test_tension_alone_is_held_against_the_bars(each: Edition) -> None:
    # Hand: 0.90 * 8 in^2 * 60 ksi = 432 kip.
    result = axial_and_bending(SQUARE, [Force("uplift", -216_000.0)], each)
    assert result.ratio == pytest.approx(0.5)


def test_a_balanced_point_of_a_textbook(each: Edition) -> None:
    # From memory: Wight & MacGregor, Reinforced Concrete, Example 11-1: 16 in square, four No. 9 on each of two faces,
    # 2.5 in to their centres, f'c 5 ksi: P_n 417 kip and M_n 386 kip-ft at eps_t = 0.00207, phi P_n,max 798 kip.
    column = replace(SQUARE, bars=Bars(8, 9, 4, 2), cover=2.5 - 0.375 - 0.564, f_c=5_000.0)
    result = axial_and_bending(column, [Force("a", 0.65 * 417_000.0, 0.65 * 386.0 * FT)], each)
    # 318-14 lets the yield strain of Grade 60 be 0.002, so phi has begun to rise: 0.65 + 0.25 (0.00207 - 0.002)/0.003.
    phi = 0.65 + 0.25 * 0.00007 / 0.003 if each.name == "ACI 318-14" else 0.65
    assert result.ratio == pytest.approx(0.65 / phi, rel=0.005)
    assert result.values["phi_P_n_max"][0] == pytest.approx(798.0, rel=0.002)


def test_the_governing_load_is_the_one_of_the_largest_ratio(each: Edition) -> None:
    forces = [Force("a", 400_000.0), Force("b", 200_000.0, 150.0 * FT, 60.0 * FT), Force("c", 90_000.0, 20.0 * FT)]
    together = axial_and_bending(SQUARE, forces, each)
    alone = {force.combination: axial_and_bending(SQUARE, [force], each).ratio for force in forces}
    assert together.ratio == pytest.approx(max(value for value in alone.values() if value is not None))
    assert alone[together.combination] == pytest.approx(together.ratio)


def test_signs_of_moments_do_not_matter_to_a_symmetric_section(each: Edition) -> None:
    ratios = [
        axial_and_bending(SQUARE, [Force("a", 150_000.0, x * 90.0 * FT, y * 40.0 * FT)], each).ratio
        for x in (1, -1)
        for y in (1, -1)
    ]
    assert ratios == pytest.approx([ratios[0]] * 4, rel=1e-8)


def test_x_bends_in_the_depth(each: Edition) -> None:
    deep = replace(SQUARE, h=24.0)
    strong = axial_and_bending(deep, [Force("a", 100_000.0, Mx=150.0 * FT)], each).ratio
    weak = axial_and_bending(deep, [Force("a", 100_000.0, My=150.0 * FT)], each).ratio
    assert strong is not None
    assert weak is not None
    assert strong < weak


def test_no_moment_ratio_where_the_axial_force_alone_exceeds_the_strength(each: Edition) -> None:
    result = axial_and_bending(SQUARE, [Force("a", 700_000.0, 10.0 * FT)], each)
    assert result.verdict == "NG"
    assert result.values["moment_ratio"] == (None, "")


def test_both_ratios_agree_on_the_surface(each: Edition) -> None:
    result = axial_and_bending(SQUARE, [Force("a", 100_000.0, 100.0 * FT)], each)
    assert result.ratio is not None
    scaled = [Force("a", 100_000.0 / result.ratio, 100.0 * FT / result.ratio)]
    on = axial_and_bending(SQUARE, scaled, each)
    assert on.ratio == pytest.approx(1.0, rel=1e-6)
    assert on.values["moment_ratio"][0] == pytest.approx(1.0, rel=1e-4)


def test_a_column_without_forces_states_its_strength(each: Edition) -> None:
    result = axial_and_bending(SQUARE, [], each)
    assert (result.ratio, result.verdict, set(result.values)) == (None, "", {"P_o", "phi_P_n_max"})


def test_editions_differ_for_high_grade_steel_in_the_transition(e14: Edition, e19: Edition) -> None:
    # 318-14 is tension-controlled at 0.005, 318-19 at f_y/E_s + 0.003, which is 0.00576 for Grade 80 (trap of phi).
    column, forces = replace(SQUARE, f_y=80_000.0), [Force("a", 60_000.0, 180.0 * FT)]
    older, newer = axial_and_bending(column, forces, e14), axial_and_bending(column, forces, e19)
    assert older.ratio is not None
    assert newer.ratio is not None
    assert older.ratio <= newer.ratio
