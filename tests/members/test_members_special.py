"""Columns of special moment frames, and lateral support of bars by legs: both sides of each limit, both editions."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from calcpack.aci318.editions import EDITIONS, Edition, edition
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_section import Bars, Column, Force, Ties
from calcpack.members.column_special import special_checks, special_owed
from calcpack.members.column_ties import transverse_checks
from calcpack.members.pad import FloatPad
from calcpack.members.results import CheckResult

# The 24 in square column of col-smf-ash-24 with four bars a face, every one held: No. 4 hoops at 4 in.
SQUARE = Column(
    *("C1", 24.0, 24.0, Bars(12, 8, 4, 4), Ties("ties", 4, 4.0), 1.5, 5_000.0, 60_000.0),
    l_u=144.0,
    seismic="special",
    legs_x=4,
    legs_y=4,
    file="inputs/columns.csv",
    row=2,
)
ROUND = Column("C2", None, 24.0, Bars(8, 8), Ties("spiral", 4, 2.5), 1.5, 5_000.0, 60_000.0, seismic="special")
# 0.3 A_g f_c of the square column is 864 kip.
LOW, HIGH = Force("low", 864_000.0), Force("high", 864_001.0, file="inputs/forces.csv", row=7)
FRAME = ", special moment frame"


def results(column: Column, forces: list[Force], one: Edition) -> dict[str, CheckResult]:
    found = special_checks(ColumnWorking(FloatPad(), column, one), forces)
    assert all(result.check.endswith(FRAME) for result in found)
    assert len({result.check for result in found}) == len(found)
    return {result.check.removesuffix(FRAME): result for result in found}


def number(result: CheckResult, symbol: str) -> float:
    value = result.values[symbol][0]
    assert value is not None
    return value


def test_other_columns_owe_nothing_here(each: Edition, steps: Any) -> None:
    assert special_checks(ColumnWorking(steps, replace(SQUARE, seismic="none"), each), [LOW]) == []
    assert steps.steps == []


def test_names_of_the_checks(each: Edition) -> None:
    common = ["dimensions", "materials", "reinforcement ratio"]
    after = ["length l_o", "spacing of held bars", "spacing within l_o"]
    assert list(results(SQUARE, [LOW], each)) == [
        *common, *after, "confinement, x", "confinement, y", "spacing outside l_o",
    ]  # fmt: skip
    assert list(results(ROUND, [LOW], each)) == [
        *common, "number of bars", *after, "confinement", "spacing outside l_o",
    ]  # fmt: skip


def test_what_is_not_covered_is_named() -> None:
    text = " ".join(special_owed())
    assert "18.7.3" in text
    assert "18.7.6" in text


# Dimensions, materials, bars


@pytest.mark.parametrize(
    ("b", "h", "ratio", "verdict"),
    # From memory, 18.7.2.1: 12 in, and 0.4 between the dimensions.
    [(12.0, 24.0, 1.0, "OK"), (11.9, 24.0, 12 / 11.9, "NG"), (16.0, 40.0, 1.0, "OK"), (40.0, 15.9, 16 / 15.9, "NG")],
)
def test_dimensions(b: float, h: float, ratio: float, verdict: str, each: Edition) -> None:
    result = results(replace(SQUARE, b=b, h=h), [LOW], each)["dimensions"]
    assert (result.ratio, result.verdict, result.clause) == (pytest.approx(ratio), verdict, "18.7.2.1")


def test_dimensions_of_a_circular_column(each: Edition) -> None:
    assert results(replace(ROUND, h=12.0), [LOW], each)["dimensions"].ratio == 1.0


@pytest.mark.parametrize(("f_y", "old", "new"), [(60e3, "OK", "OK"), (75e3, "NG", "OK"), (80e3, "NG", "OK")])
def test_yield_strength_of_longitudinal_bars(f_y: float, old: str, new: str, e14: Edition, e19: Edition) -> None:
    # From memory, Table 20.2.2.4a: 60,000 psi in 318-14, 80,000 psi in 318-19.
    column = replace(SQUARE, f_y=f_y, f_yt=60_000.0)
    assert results(column, [LOW], e14)["materials"].verdict == old
    assert results(column, [LOW], e19)["materials"].verdict == new


def test_grade_100_bars_are_beyond_318_19(e19: Edition) -> None:
    assert results(replace(SQUARE, f_y=100e3), [LOW], e19)["materials"].ratio == pytest.approx(1.25)


@pytest.mark.parametrize(("f_c", "verdict"), [(2_999.0, "NG"), (3_000.0, "OK")])
def test_strength_of_concrete(f_c: float, verdict: str, each: Edition) -> None:
    assert results(replace(SQUARE, f_c=f_c), [Force("a", 1.0)], each)["materials"].verdict == verdict


@pytest.mark.parametrize(("side", "verdict"), [(20.0, "OK"), (19.99, "NG"), (60.0, "NG")])
def test_reinforcement_ratio(side: float, verdict: str, each: Edition) -> None:
    # From memory, 18.7.4.1: 0.01 to 0.06. Hand: twenty-four No. 9 are 24 in^2, 0.06 of 400 in^2 and 0.0067 of 3,600.
    column = replace(SQUARE, b=side, h=side, bars=Bars(24, 9, 7, 7))
    assert results(column, [LOW], each)["reinforcement ratio"].verdict == verdict


@pytest.mark.parametrize(("count", "ratio"), [(5, 1.2), (6, 1.0), (8, 0.75)])
def test_number_of_bars_in_circular_hoops(count: int, ratio: float, each: Edition) -> None:
    assert results(replace(ROUND, bars=Bars(count, 8)), [LOW], each)["number of bars"].ratio == pytest.approx(ratio)


# Length and spacing


@pytest.mark.parametrize(("l_u", "l_o"), [(144.0, 24.0), (150.0, 25.0)])
def test_confined_length(l_u: float, l_o: float, each: Edition) -> None:
    result = results(replace(SQUARE, l_u=l_u), [LOW], each)["length l_o"]
    assert (result.values["l_o"], result.ratio, result.verdict) == ((l_o, "in"), None, "")
    assert result.notes == ()


def test_confined_length_goes_by_the_larger_dimension(each: Edition) -> None:
    assert results(replace(SQUARE, b=30.0), [LOW], each)["length l_o"].values["l_o"] == (30.0, "in")


def test_confined_length_without_the_height(each: Edition) -> None:
    result = results(replace(SQUARE, l_u=None), [LOW], each)["length l_o"]
    assert result.values["l_o"] == (24.0, "in")
    assert result.notes == ("The unsupported length is not stated: l_u/6 is not checked.",)


def test_spacing_of_held_bars(each: Edition) -> None:
    # Hand: 24 - 2 * 2 - 1 = 19 in between corner bars, 6.333 in with every bar held, 12.667 in with three legs.
    held = results(SQUARE, [LOW], each)["spacing of held bars"]
    assert (held.ratio, held.clause) == (pytest.approx(19 / 3 / 14), "18.7.5.2(e)")
    three = results(replace(SQUARE, legs_y=3), [LOW], each)["spacing of held bars"]
    assert number(three, "h_x") == pytest.approx(38 / 3)
    two = results(replace(SQUARE, legs_y=2), [LOW], each)["spacing of held bars"]
    assert (number(two, "h_x"), two.verdict) == (pytest.approx(19.0), "NG")


def test_legs_hold_the_bars_of_the_faces_that_they_cross(each: Edition) -> None:
    # b = 30, h = 20 in, five bars along x, three along y: legs parallel to y hold the former.
    oblong = replace(SQUARE, b=30.0, h=20.0, bars=Bars(12, 8, 5, 3))
    along_x, along_y = (30.0 - 5.0) / 4, (20.0 - 5.0) / 2
    all_held = results(replace(oblong, legs_x=3, legs_y=5), [LOW], each)["spacing of held bars"]
    assert number(all_held, "h_x") == pytest.approx(max(along_x, along_y))
    few_y = results(replace(oblong, legs_x=3, legs_y=3), [LOW], each)["spacing of held bars"]
    assert number(few_y, "h_x") == pytest.approx(2 * along_x)
    few_x = results(replace(oblong, legs_x=2, legs_y=5), [LOW], each)["spacing of held bars"]
    assert number(few_x, "h_x") == pytest.approx(2 * along_y)


def test_more_legs_than_bars_hold_no_more(each: Edition) -> None:
    assert number(results(replace(SQUARE, legs_y=6), [LOW], each)["spacing of held bars"], "h_x") == pytest.approx(
        19 / 3
    )


@pytest.mark.parametrize(("load", "most", "verdict"), [(LOW, 14.0, "OK"), (HIGH, 8.0, "OK")])
def test_high_axial_force_brings_bars_closer(load: Force, most: float, verdict: str, each: Edition) -> None:
    # From memory, 18.7.5.2(f): above 0.3 A_g f_c = 864 kip, 8 in and every bar held.
    result = results(SQUARE, [load], each)["spacing of held bars"]
    assert (result.values["h_x_max"], result.verdict) == ((most, "in"), verdict)
    assert result.ratio == pytest.approx(19 / 3 / 14 if most == 14.0 else 1.0)


def test_high_axial_force_asks_for_every_bar_to_be_held(each: Edition) -> None:
    # Seven bars a face, 19/6 = 3.17 in apart: four legs hold every other one, 6.33 in apart and still not enough.
    seven = replace(SQUARE, bars=Bars(24, 8, 7, 7))
    assert results(seven, [LOW], each)["spacing of held bars"].verdict == "OK"
    result = results(seven, [HIGH], each)["spacing of held bars"]
    assert number(result, "h_x") == pytest.approx(19 / 3)
    assert (result.ratio, result.verdict) == (pytest.approx(7 / 4), "NG")


def test_strong_concrete_counts_as_a_high_axial_force(each: Edition) -> None:
    at, above = (replace(SQUARE, f_c=f_c) for f_c in (10_000.0, 10_001.0))
    load = [Force("a", 100_000.0)]
    assert results(at, load, each)["spacing of held bars"].values["h_x_max"] == (14.0, "in")
    assert results(above, load, each)["spacing of held bars"].values["h_x_max"] == (8.0, "in")
    assert results(replace(ROUND, f_c=10_001.0), load, each)["spacing of held bars"].values["h_x_max"] == (14.0, "in")


@pytest.mark.parametrize(("spacing", "verdict"), [(6.0, "OK"), (6.01, "NG")])
def test_spacing_of_hoops(spacing: float, verdict: str, each: Edition) -> None:
    # From memory, 18.7.5.3: 24/4 = 6, 6 * 1 = 6 in, s_o = min(4 + (14 - 6.33)/3, 6) = 6 in.
    result = results(replace(SQUARE, ties=Ties("ties", 4, spacing)), [LOW], each)["spacing within l_o"]
    assert (result.values["s_max"], result.verdict) == ((6.0, "in"), verdict)


def test_spacing_of_hoops_by_the_bars_held(each: Edition) -> None:
    # Hand: h_x = 12.667 in: 4 + 1.333/3 = 4.444 in.
    result = results(replace(SQUARE, legs_y=3), [LOW], each)["spacing within l_o"]
    assert number(result, "s_max") == pytest.approx(4.4444, rel=1e-4)


def test_spacing_with_grade_80_bars(e14: Edition, e19: Edition) -> None:
    # From memory: 5 d_b = 5 in for Grade 80 in 318-19; 318-14 knows 6 d_b alone.
    high = replace(SQUARE, f_y=80_000.0, f_yt=60_000.0)
    assert number(results(high, [LOW], e19)["spacing within l_o"], "s_max") == 5.0
    assert number(results(high, [LOW], e19)["spacing outside l_o"], "s_max") == 5.0
    assert number(results(high, [LOW], e14)["spacing within l_o"], "s_max") == 6.0
    assert number(results(high, [LOW], e14)["spacing outside l_o"], "s_max") == 6.0


@pytest.mark.parametrize(
    ("beyond", "ratio"), [(None, 4 / 6), (Ties("ties", 4, 6.0), 1.0), (Ties("ties", 4, 6.1), 6.1 / 6)]
)
def test_spacing_outside_the_confined_length(beyond: Ties | None, ratio: float, each: Edition) -> None:
    result = results(replace(SQUARE, ties_beyond=beyond), [LOW], each)["spacing outside l_o"]
    assert (result.ratio, result.clause) == (pytest.approx(ratio), "18.7.5.5")
    assert len(result.notes) == (1 if beyond is None else 0)


# Confinement


def test_confinement_of_the_reference_column(each: Edition) -> None:
    # col-smf-ash-24, common practice: 0.00765. Hand: four No. 4 at 4 in over 21 in: 0.8/84 = 0.0095238.
    found = results(SQUARE, [LOW], each)
    for axis in ("x", "y"):
        result = found[f"confinement, {axis}"]
        assert number(result, "b_c") == 21.0
        assert number(result, "r_sh_min") == pytest.approx(0.00765, rel=1e-3)
        assert number(result, "r_sh") == pytest.approx(0.0095238, rel=1e-4)
        assert (result.verdict, result.clause) == ("OK", "Table 18.7.5.4")


def test_confinement_of_each_direction_takes_its_own_legs_and_core(each: Edition) -> None:
    # b = 30, h = 20 in. Legs parallel to x stand across 17 in of core, legs parallel to y across 27 in.
    found = results(replace(SQUARE, b=30.0, h=20.0, legs_x=3, legs_y=5), [LOW], each)
    assert number(found["confinement, x"], "r_sh") == pytest.approx(3 * 0.2 / (4 * 17.0))
    assert number(found["confinement, y"], "r_sh") == pytest.approx(5 * 0.2 / (4 * 27.0))


def test_confinement_under_a_high_axial_force(each: Edition) -> None:
    # Hand, P_u = 1,440 kip, twelve bars held, k_n = 1.2: 0.2 * 1.2 * 1440/(60 * 441) = 0.0130612.
    found = results(SQUARE, [Force("a", 1_440_000.0), LOW], each)["confinement, x"]
    assert number(found, "r_sh_min") == pytest.approx(0.0130612, rel=1e-5)
    assert (found.combination, found.verdict) == ("a", "NG")
    # Three legs in both directions hold eight bars: k_n = 8/6.
    fewer = results(replace(SQUARE, legs_x=3, legs_y=3), [Force("a", 1_440_000.0)], each)["confinement, x"]
    assert number(fewer, "r_sh_min") == pytest.approx(0.2 * 8 / 6 * 1440 / (60 * 441), rel=1e-5)


def test_confinement_just_above_the_threshold_takes_the_largest_expression(each: Edition) -> None:
    # Hand: at 864 kip (c) is 0.2 * 1.2 * 864/(60 * 441) = 0.0078367, above (a) = 0.0076531: there is a step.
    low, high = (number(results(SQUARE, [load], each)["confinement, x"], "r_sh_min") for load in (LOW, HIGH))
    assert low == pytest.approx(0.0076531, rel=1e-4)
    assert high == pytest.approx(0.0078367, rel=1e-4)


@pytest.mark.parametrize(("f_yt", "least"), [(None, 0.0076531), (80_000.0, 0.0057398), (100_000.0, 0.0045918)])
def test_yield_strength_of_hoops(f_yt: float | None, least: float, each: Edition) -> None:
    result = results(replace(SQUARE, f_yt=f_yt), [LOW], each)["confinement, x"]
    assert number(result, "r_sh_min") == pytest.approx(least, rel=1e-4)


def test_confinement_by_a_spiral(each: Edition) -> None:
    # Hand: rho_s = 4 * 0.2 * 20.5/(2.5 * 21^2) = 0.014875; (d) 0.0114796, (e) 0.01.
    result = results(ROUND, [Force("a", 100_000.0)], each)["confinement"]
    assert number(result, "rho_s") == pytest.approx(0.014875, rel=1e-4)
    assert number(result, "rho_s_min") == pytest.approx(0.0114796, rel=1e-5)
    assert result.verdict == "OK"


def test_confinement_by_circular_hoops_under_a_high_axial_force(each: Edition) -> None:
    # Hand: (f) 0.35 * 1,200/(60 * 346.361) = 0.0202101; 0.3 A_g f_c = 678.6 kip.
    hoops = replace(ROUND, ties=Ties("ties", 4, 2.5))
    result = results(hoops, [Force("a", 1_200_000.0)], each)["confinement"]
    assert number(result, "rho_s_min") == pytest.approx(0.0202101, rel=1e-5)
    assert result.verdict == "NG"


# The axial force


def test_the_largest_compression_governs(each: Edition, steps: Any) -> None:
    special_checks(ColumnWorking(steps, SQUARE, each), [LOW, Force("pull", -9e6), HIGH, Force(None, 9e6)])
    assert "high has the largest compression of 3 combinations." in steps.reasons
    assert steps.source("P_u") == "inputs/forces.csv, row 7"
    assert any(text.startswith("P_u is above 0.3 A_g f_c") for text in steps.reasons)


@pytest.mark.parametrize("forces", [[], [Force(None, 9e6)]])
def test_without_a_factored_force_a_note_says_so(forces: list[Force], each: Edition) -> None:
    found = results(SQUARE, forces, each)
    note = "No factored axial force is listed: what depends on P_u is not checked."
    assert found["confinement, x"].notes == (note,)
    assert found["spacing of held bars"].notes == (note,)
    assert number(found["confinement, x"], "r_sh_min") == pytest.approx(0.00765, rel=1e-3)


@pytest.mark.parametrize("P", [0.0, -50_000.0])
def test_a_column_that_is_not_compressed(P: float, each: Edition, steps: Any) -> None:
    found = special_checks(ColumnWorking(steps, SQUARE, each), [Force("a", P)])
    assert "No combination compresses the column." in steps.reasons
    assert all(result.verdict in ("OK", "") for result in found)


# Lateral support of bars by legs


def support(column: Column, one: Edition) -> CheckResult:
    return list(transverse_checks(ColumnWorking(FloatPad(), column, one)))[-1]


# Five bars along each face of 24 in, 19/4 - 1 = 3.75 in clear; of 40 in, 35/4 - 1 = 7.75 in clear.
FIVE = replace(SQUARE, bars=Bars(16, 8, 5, 5))


def test_two_legs_leave_bars_between_corners_open(each: Edition) -> None:
    result = support(replace(FIVE, legs_x=2, legs_y=2), each)
    assert (result.ratio, result.verdict) == (None, "")
    note = "Bars between the corners along x and along y need crossties; the schedule does not show any."
    assert result.notes == (note,)


def test_every_bar_held(each: Edition, steps: Any) -> None:
    for legs in (5, 6):
        result = support(replace(FIVE, legs_x=legs, legs_y=legs), each)
        assert (result.ratio, result.verdict, number(result, "x_clear")) == (0.0, "OK", 0.0)
    list(transverse_checks(ColumnWorking(steps, replace(FIVE, legs_x=5, legs_y=5), each)))
    assert "Every bar is held by a leg of the ties or by a crosstie." in steps.reasons


@pytest.mark.parametrize(("side", "ratio", "verdict"), [(24.0, 1.0, "OK"), (33.0, 1.0, "OK"), (33.1, 6.025 / 6, "NG")])
def test_every_other_bar_held(side: float, ratio: float, verdict: str, each: Edition) -> None:
    # From memory, 25.7.2.3: three legs hold bars 1, 3 and 5; the others within 6 in clear, (33 - 5)/4 - 1 = 6 in.
    result = support(replace(FIVE, b=side, h=side, legs_x=3, legs_y=3), each)
    assert (result.ratio, result.verdict) == (pytest.approx(ratio), verdict)


@pytest.mark.parametrize(("n", "legs", "ratio"), [(6, 3, 3.5 / 3), (7, 3, 4 / 3), (7, 4, 1.0)])
def test_two_neighbours_without_support_are_ng(n: int, legs: int, ratio: float, each: Edition) -> None:
    # From memory, 25.7.2.3: six bars need (6 + 1)/2 legs, so four; seven need four.
    result = support(replace(SQUARE, bars=Bars(4 * n - 4, 8, n, n), legs_x=legs, legs_y=legs), each)
    assert result.ratio == pytest.approx(ratio)
    assert result.verdict == ("OK" if ratio <= 1 else "NG")


def test_legs_parallel_to_y_hold_the_bars_along_x(each: Edition) -> None:
    oblong = replace(SQUARE, b=30.0, bars=Bars(12, 8, 5, 3))
    assert support(replace(oblong, legs_x=3, legs_y=5), each).ratio == 0.0
    assert support(replace(oblong, legs_x=5, legs_y=2), each).ratio is None
    # Three bars along y, (24 - 5)/2 - 1 = 8.5 in clear, need a crosstie that two legs do not show.
    note = "Bars between the corners along y need crossties; the schedule does not show any."
    assert support(replace(oblong, legs_x=2, legs_y=5), each).notes == (note,)


# Page and bulk


RECTANGULAR = st.builds(
    lambda b, h, n_x, n_y, s, legs_x, legs_y, f_c, f_y: replace(
        SQUARE,
        b=b, h=h, bars=Bars(2 * (n_x + n_y) - 4, 8, n_x, n_y), ties=Ties("ties", 4, s),
        legs_x=legs_x, legs_y=legs_y, f_c=f_c, f_y=f_y, f_yt=60_000.0,
    ),
    *(st.floats(12.0, 40.0), st.floats(12.0, 40.0), st.integers(2, 6), st.integers(2, 6), st.floats(2.0, 8.0)),
    *(st.integers(2, 6), st.integers(2, 6), st.floats(3_000.0, 14_000.0), st.sampled_from([60_000.0, 80_000.0])),
)  # fmt: skip
CIRCULAR = st.builds(
    lambda h, n, kind, s, f_c: replace(ROUND, h=h, bars=Bars(n, 8), ties=Ties(kind, 4, s), f_c=f_c),
    *(st.floats(16.0, 48.0), st.integers(4, 20), st.sampled_from(["ties", "spiral"]), st.floats(1.0, 8.0)),
    st.floats(3_000.0, 14_000.0),
)
COLUMNS = RECTANGULAR | CIRCULAR
LOADS = st.lists(st.builds(Force, combination=st.sampled_from("abc"), P=st.floats(-5e5, 5e6)), max_size=4)
NAMES = st.sampled_from(list(EDITIONS))
EXAMPLES = settings(max_examples=60, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])


@EXAMPLES
@given(column=COLUMNS, forces=LOADS, name=NAMES)
def test_page_and_bulk_come_to_the_same(column: Column, forces: list[Force], name: str, recording: Any) -> None:
    one, pad = edition(name), recording()
    work = ColumnWorking(pad, column, one)
    found = [*transverse_checks(work), *special_checks(work, forces)]
    plain = ColumnWorking(FloatPad(), column, one)
    assert found == [*transverse_checks(plain), *special_checks(plain, forces)]
    assert ("NG" in pad.words) is any(result.verdict == "NG" for result in found)
    shown = [verdict.ratio for verdict in pad.verdicts]
    assert all(result.ratio in shown for result in found if result.ratio)
    assert len(pad.told("verdict")) == len(set(pad.told("verdict")))
    stated = [(item.symbol, item.means) for item in pad.givens]
    assert len(stated) == len(set(stated))
    for _, formula in pad.clauses:
        assert formula.clause(one.standard).standard in (one.standard, None)


@EXAMPLES
@given(column=COLUMNS, name=NAMES, P=st.floats(0.0, 2e6), more=st.floats(1.0, 3.0))
def test_a_larger_compression_never_helps(column: Column, name: str, P: float, more: float) -> None:
    one = edition(name)
    small, large = (results(column, [Force("a", P * k)], one) for k in (1.0, more))
    for check, result in small.items():
        assert (result.ratio or 0.0) <= (large[check].ratio or 0.0) * (1 + 1e-12)


@EXAMPLES
@given(column=RECTANGULAR, name=NAMES, P=st.floats(0.0, 4e6))
def test_turning_a_column_by_a_right_angle_turns_its_confinement(column: Column, name: str, P: float) -> None:
    one, bars, load = edition(name), column.bars, [Force("a", P)]
    turned = replace(
        column,
        b=column.h, h=column.b or 0.0, bars=Bars(bars.count, 8, bars.n_y, bars.n_x),
        legs_x=column.legs_y, legs_y=column.legs_x,
    )  # fmt: skip
    before, after = results(column, load, one), results(turned, load, one)
    assert before["confinement, x"].ratio == pytest.approx(after["confinement, y"].ratio)
    for check in ("spacing of held bars", "spacing within l_o", "dimensions", "spacing outside l_o"):
        assert before[check].ratio == pytest.approx(after[check].ratio)


@EXAMPLES
@given(column=RECTANGULAR, name=NAMES, P=st.floats(0.0, 4e6))
def test_least_confinement_by_an_independent_computation(column: Column, name: str, P: float) -> None:
    # Table 18.7.5.4 written out apart from the program.
    b, h, held = column.b or 0.0, column.h, 0
    gross, core = b * h, (b - 3.0) * (h - 3.0)
    least = max(0.3 * (gross / core - 1), 0.09) * column.f_c / 60_000.0
    if 0.3 * gross * column.f_c < P or column.f_c > 10_000:
        held = 2 * min(column.bars.n_x or 0, column.legs_y) + 2 * min(column.bars.n_y or 0, column.legs_x) - 4
        k_f = max(column.f_c / 25_000 + 0.6, 1.0)
        least = max(least, 0.2 * k_f * held / (held - 2) * P / (60_000.0 * core))
    found = results(column, [Force("a", P)], edition(name))["confinement, x"]
    assert number(found, "r_sh_min") == pytest.approx(least)
    assert found.ratio == pytest.approx(least * column.ties.spacing * (h - 3.0) / (column.legs_x * 0.2))
