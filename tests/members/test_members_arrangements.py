"""Arrangements of bars: the search against every candidate, facts by hand, and what the notes say."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import replace
from itertools import pairwise, product
from typing import Any

import pytest

from calcpack.aci318.bars import bar
from calcpack.aci318.editions import Edition
from calcpack.errors import RangeError
from calcpack.members.arrangements import SIZES, STRENGTH, Arrangement, Arrangements, arrangements
from calcpack.members.column import Context, check
from calcpack.members.column_loads import LoadRow, combined
from calcpack.members.column_section import Bars, Column, Force, Ties

ALL = 10_000
TIED = Column("C1", 16.0, 16.0, Bars(8, 9, 3, 3), Ties("ties", 3, 12.0), 1.5, 4_000.0, 60_000.0)
SMALL = Column("C2", 11.0, 11.0, Bars(4, 8, 2, 2), Ties("ties", 3, 4.0), 1.5, 5_000.0, 60_000.0, aggregate=0.75)
ROUND = Column("C3", None, 15.0, Bars(6, 8), Ties("spiral", 3, 2.0), 1.5, 4_000.0, 60_000.0, f_yt=60_000.0)
LIGHT = [Force("1.2D+1.6L", 50_000.0)]
BENT = [
    Force("1.4D", 150_000.0, 90_000.0, -60_000.0),
    Force("1.2D+1.6L", 210_000.0, 150_000.0, 120_000.0, Vx=4_000.0, Vy=2_000.0),
    Force("1.2D+1.0W", 120_000.0, 380_000.0, 60_000.0, Vx=6_000.0, Vy=3_000.0),
    Force("0.9D+1.0W", 20_000.0, -300_000.0, 200_000.0, Vx=-6_000.0),
]


def scaled(share: float) -> list[Force]:
    return [
        replace(force, P=share * force.P, Mx=share * (force.Mx or 0.0), My=share * (force.My or 0.0)) for force in BENT
    ]


def one_by_one(column: Column, forces: Sequence[Any], context: Context, around: range) -> Iterator[Arrangement]:
    """Every candidate with every check, whatever its spacing; only what cannot be built is left out."""
    for size in SIZES:
        taken = 2 * (column.cover + bar(column.ties.size).d_b + bar(size).d_b)
        if min(column.b or column.h, column.h) <= taken:
            continue
        layouts = [(n, None, None) for n in around]
        if column.b is not None:
            layouts = [(2 * (x + y) - 4, x, y) for x, y in product(around, around)]
        for count, n_x, n_y in layouts:
            try:
                results = check(replace(column, bars=Bars(count, size, n_x, n_y)), forces, context)
            except RangeError:
                continue  # Bars that overlap are refused.
            if all(result.verdict != "NG" for result in results):
                yield as_checked(column, Bars(count, size, n_x, n_y), results)


def as_checked(column: Column, bars: Bars, results: Sequence[Any]) -> Arrangement:
    of = {result.check: result for result in results}
    strengths = {name: of[name].ratio for name in of if name in STRENGTH and of[name].ratio is not None}
    governing = max(strengths, key=lambda name: strengths[name])
    text = f"{bars.count}-#{bars.size}" + (f" ({bars.n_x}x{bars.n_y})" if bars.n_x else "")
    area = bars.count * bar(bars.size).A_b
    return Arrangement(
        text, bars.size, bars.count, bars.n_x, bars.n_y, area, of["reinforcement ratio"].values["rho_g"][0],
        governing, strengths[governing], of["axial and bending"].ratio, bars == column.bars, (),
        {name: " ".join(of[name].notes) for name in of if not of[name].verdict},
    )  # fmt: skip


def lightest_first(one: Arrangement) -> Any:
    assert one.bending is not None
    return round(one.A_st, 6), one.count, round(one.bending, 6), one.n_x or 0, one.n_y or 0


def texts(found: Arrangements) -> list[str]:
    return [one.bars for one in found.found]


def refused(found: Arrangements) -> int:
    return sum(found.rejected.values())


# Against every candidate. The widest range is chosen so that one bar more than it has would not fit.

SLENDER = replace(SMALL, b=10.0, h=14.0, l_u=130.0, frame="nonsway", legs_y=3)
SPECIAL = replace(
    SMALL, b=12.0, h=12.0, ties=Ties("ties", 5, 2.5), f_yt=100_000.0, seismic="special", legs_x=3, legs_y=3
)
HOOPED = replace(ROUND, h=13.0, ties=Ties("ties", 3, 10.0), aggregate=1.25)


@pytest.mark.parametrize(
    ("column", "forces", "stiffness", "around"),
    [
        (SMALL, scaled(1.6), "a", range(2, 5)),
        (SLENDER, scaled(0.7), "b", range(2, 6)),
        (SPECIAL, scaled(2.2), "a", range(2, 5)),
        (ROUND, scaled(2.9), "a", range(3, 17)),
        (HOOPED, BENT[:3], "a", range(3, 12)),
    ],
    ids=["square", "slender, stiffness by bars", "special moment frame", "spiral", "circular ties"],
)
def test_the_same_as_every_candidate_with_every_check(
    column: Column, forces: list[Force], stiffness: str, around: range, each: Edition
) -> None:
    context = Context(each, stiffness=stiffness)
    found = arrangements(column, forces, context, ALL)
    expected = sorted(one_by_one(column, forces, context, around), key=lightest_first)
    assert list(found.found) == expected
    assert found.tried == found.fitting == len(expected) + refused(found)
    # Neither all nor none, or the comparison would say little.
    assert found.found
    assert refused(found)


@pytest.mark.parametrize("column", [SMALL, ROUND], ids=lambda column: column.mark)
def test_a_short_list_is_the_beginning_of_a_long_one(column: Column, e19: Edition) -> None:
    whole = arrangements(column, BENT, Context(e19), ALL)
    assert len(whole.found) > 4
    for most in (1, 3, len(whole.found)):
        short = arrangements(column, BENT, Context(e19), most)
        assert short.found == whole.found[:most]
        assert short.tried <= whole.tried
        assert (short.fitting, short.present) == (whole.fitting, whole.present)
    assert arrangements(column, BENT, Context(e19), 1).tried < whole.tried


# By hand


def test_the_lightest_of_a_column_that_carries_little(each: Edition) -> None:
    # From memory, ACI 318 10.6.1.1 and 25.7.2.1: at least 0.01 * 256 = 2.56 in^2, and 16 d_b of at least 12 in: #6 and
    # larger. 4-#7 is 2.40, 6-#6 2.64, 4-#8 3.16, 8-#6 3.52. Three bars on a face are (16 - 3.75 - 2.25)/2 = 5 in apart:
    # the middle one needs no crosstie. Of four on a face the two inner ones do, and the schedule shows none.
    found = arrangements(TIED, LIGHT, Context(each), 6)
    assert texts(found) == ["6-#6 (2x3)", "6-#6 (3x2)", "4-#8 (2x2)", "8-#6 (2x4)", "8-#6 (3x3)", "8-#6 (4x2)"]
    first = found.found[0]
    assert (first.size, first.count, first.n_x, first.n_y) == (6, 6, 2, 3)
    assert first.A_st == pytest.approx(2.64)
    assert first.rho_g == pytest.approx(2.64 / 256)
    assert {one.bars: list(one.undecided) for one in found.found if one.undecided} == {
        "8-#6 (2x4)": ["lateral support of bars"], "8-#6 (4x2)": ["lateral support of bars"],
    }  # fmt: skip
    crossties = "No verdict on lateral support of bars: Bars between the corners along {} need crossties"
    assert [note[: len(crossties) - 1] for note in found.notes] == [crossties.format("y"), crossties.format("x")]


@pytest.mark.parametrize(("spacing", "first"), [(12.0, "6-#6 (2x3)"), (12.01, "6-#7 (2x3)")])
def test_the_spacing_of_ties_rules_out_thin_bars(spacing: float, first: str, each: Edition) -> None:
    # 16 d_b of a #6 is 12 in. 4-#8 at 3.16 is lighter than 6-#7 at 3.60, so it comes before it.
    found = arrangements(replace(TIED, ties=Ties("ties", 3, spacing)), LIGHT, Context(each), 3)
    assert (texts(found)[0] == first) == (spacing == 12.0)
    assert first in texts(found)


@pytest.mark.parametrize(("share", "first"), [(1.0, "6-#9"), (1.0 + 1e-6, "14-#6")])
def test_the_load_that_the_bars_just_carry(share: float, first: str, each: Edition) -> None:
    # From memory, ACI 318 22.4.2: 0.65 * 0.80 * (0.85 * 4 * (256 - 6.00) + 60 * 6.00) = 629.2 kip with 6.00 in^2, by
    # 6-#9 and by 10-#7. The next one up is 14-#6 with 6.16 in^2.
    column = replace(TIED, ties=Ties("ties", 4, 12.0))
    found = arrangements(column, [Force("1.4D", share * 629_200.0)], Context(each), 1).found[0]
    assert found.bars.split(" ")[0] == first
    assert found.governing in ("axial and bending", "axial strength")
    assert found.ratio == found.bending == pytest.approx(1.0 if first == "6-#9" else 629.2 / 633.9, abs=1e-4)


def test_of_equal_area_fewer_bars_come_first(each: Edition) -> None:
    # 6-#9 and 10-#7 are 6.00 in^2 both.
    listed = texts(arrangements(TIED, LIGHT, Context(each), ALL))
    nines, sevens = ([listed.index(text) for text in listed if text.startswith(bars)] for bars in ("6-#9 ", "10-#7 "))
    assert nines == [min(nines), min(nines) + 1]
    assert max(nines) + 1 == min(sevens)


def test_of_equal_bars_the_layout_that_carries_most_comes_first(each: Edition) -> None:
    # Bars along the faces parallel to x lie farthest from the axis of M_x.
    for Mx, My, first in ((600_000.0, 0.0, "6-#6 (3x2)"), (0.0, 600_000.0, "6-#6 (2x3)")):
        found = arrangements(TIED, [Force("W", 100_000.0, Mx, My)], Context(each), 2)
        assert texts(found)[0] == first
        assert sorted(texts(found)) == ["6-#6 (2x3)", "6-#6 (3x2)"]


@pytest.mark.parametrize(
    ("column", "fewest"), [(ROUND, 6), (replace(ROUND, ties=Ties("ties", 3, 10.0)), 4)], ids=["spiral", "ties"]
)
def test_the_fewest_bars_on_a_circle(column: Column, fewest: int, each: Edition) -> None:
    # From memory, ACI 318 10.7.3.1: six within spirals, four within circular ties.
    found = arrangements(column, LIGHT, Context(each), ALL).found
    assert min(one.count for one in found) == fewest
    assert {(one.n_x, one.n_y) for one in found} == {(None, None)}
    assert found[0].bars == f"{found[0].count}-#{found[0].size}"


def test_as_many_as_fit_on_a_circle(e19: Edition) -> None:
    # On a circle of 12 - 2*1.875 - 1 = 7.25 in, 8 bars #8 are 7.25 sin(pi/8) - 1 = 1.774 in apart, 9 of them 1.480 in,
    # and 1.5 in are asked for. #10 ask for 1.905 in: on 6.98 in, 6 bars have 2.220 in, 7 have 1.759 in.
    found = arrangements(replace(ROUND, h=12.0), LIGHT, Context(e19), ALL).found
    assert [max(one.count for one in found if one.size == size) for size in (8, 10)] == [8, 6]


@pytest.mark.parametrize(("side", "most"), [(12.25, 4), (12.249, 3)])
def test_as_many_as_fit_along_a_face(side: float, most: int, each: Edition) -> None:
    # Four #8 take 4*1.0 + 3*1.5 in, and cover and ties 2*1.875 in: 12.25 in.
    found = arrangements(replace(SMALL, b=side, h=side, aggregate=None), LIGHT, Context(each), ALL).found
    assert max(one.n_x or 0 for one in found if one.size == 8) == most


@pytest.mark.parametrize(("aggregate", "most"), [(1.125, 4), (1.126, 3)])
def test_coarse_aggregate_takes_room(aggregate: float, most: int, each: Edition) -> None:
    # 4/3 of 1.125 in is 1.5 in.
    found = arrangements(replace(SMALL, b=12.25, h=12.25, aggregate=aggregate), LIGHT, Context(each), ALL).found
    assert max(one.n_x or 0 for one in found if one.size == 8) == most


# Heavier and lighter


def test_a_column_that_fails_is_given_heavier_bars(each: Edition) -> None:
    found = arrangements(SMALL, scaled(1.8), Context(each), 5)
    assert "axial and bending" in found.present.failed
    assert found.present.ratio is not None
    assert found.present.ratio > 1
    assert found.found
    assert all(one.A_st > found.present.A_st for one in found.found)
    assert all(one.ratio is not None and one.ratio <= 1 + 1e-9 for one in found.found)
    assert not any(one.present for one in found.found)


def test_a_wasteful_column_is_given_lighter_ones(each: Edition) -> None:
    found = arrangements(TIED, LIGHT, Context(each), 5)
    assert found.present.failed == ()
    assert (found.present.bars, found.present.present) == ("8-#9 (3x3)", True)
    assert all(one.A_st < found.present.A_st for one in found.found)


def test_more_load_never_gives_lighter_bars(each: Edition) -> None:
    first = []
    for share in (0.5, 1.0, 1.3, 1.6):
        first.append(arrangements(SMALL, scaled(share), Context(each), 1).found[0].A_st)
    assert first == sorted(first)
    assert first[-1] > first[0]


def test_the_list_is_in_order_and_has_the_present_arrangement_once(each: Edition) -> None:
    found = arrangements(TIED, BENT, Context(each), ALL)
    weights = [(round(one.A_st, 6), one.count) for one in found.found]
    assert all(before <= after for before, after in pairwise(weights))
    assert [one for one in found.found if one.present] == [found.present]


def test_the_other_values_of_the_column_stay(e19: Edition) -> None:
    # An arrangement says what its column says when it stands in the schedule.
    for one in arrangements(SLENDER, scaled(0.7), Context(e19), 3).found:
        column = replace(SLENDER, bars=Bars(one.count, one.size, one.n_x, one.n_y))
        there = arrangements(column, scaled(0.7), Context(e19), 3)
        assert there.present == replace(one, present=True)


# What cannot be had


def test_no_arrangement_carries_a_load_beyond_the_section(each: Edition) -> None:
    found = arrangements(SMALL, [Force("1.4D", 5_000_000.0)], Context(each))
    assert found.found == ()
    assert found.tried == found.fitting == refused(found) > 0
    assert max(found.rejected, key=lambda name: found.rejected[name]) == "axial strength"


def test_nothing_fits_within_ties_that_are_too_close(each: Edition) -> None:
    # Two #5 in 6 in: 6 - 2*1.875 - 2*0.625 = 1.0 in between them, and 1.5 in are asked for.
    tiny = replace(SMALL, b=6.0, h=6.0, bars=Bars(4, 5, 2, 2), aggregate=None)
    found = arrangements(tiny, LIGHT, Context(each))
    assert (found.found, found.fitting, found.tried, found.rejected) == ((), 0, 0, {})
    assert "bar spacing" in found.present.failed
    round_one = replace(tiny, b=None, bars=Bars(6, 3), ties=Ties("spiral", 3, 2.0), h=5.0)
    assert arrangements(round_one, LIGHT, Context(each)).fitting == 0


def test_bars_that_ask_for_larger_ties_are_left_out_and_named(each: Edition) -> None:
    # From memory, ACI 318 25.7.2.2: No. 4 ties around No. 11 and larger bars.
    column = replace(TIED, b=14.0, h=22.0)
    small = arrangements(column, LIGHT, Context(each), ALL)
    assert {one.size for one in small.found} == {6, 7, 8, 9, 10}
    assert small.rejected["tie size"] > 0
    told = "Bars of #11, #14, #18 ask for ties of 0.5 in in diameter and larger (25.7.2.2); the ties are #3: none of"
    assert [note for note in small.notes if "ask for ties" in note] == [f"{told} them is listed."]
    large = arrangements(replace(column, ties=Ties("ties", 4, 12.0)), LIGHT, Context(each), ALL)
    assert {one.size for one in large.found} == {6, 7, 8, 9, 10, 11, 14, 18}
    assert "tie size" not in large.rejected
    assert not any("ask for ties" in note for note in large.notes)


def test_what_no_bars_can_change_refuses_every_one(each: Edition) -> None:
    found = arrangements(replace(SPECIAL, ties=Ties("ties", 4, 9.0)), BENT, Context(each))
    assert found.found == ()
    assert "spacing within l_o, special moment frame" in found.present.failed
    assert refused(found) == found.tried == found.fitting


# What is not decided


def test_without_forces_the_rules_of_detailing_alone_decide(each: Edition) -> None:
    found = arrangements(TIED, [], Context(each), 3)
    assert texts(found) == texts(arrangements(TIED, LIGHT, Context(each), 3))
    first = found.found[0]
    assert (first.governing, first.ratio, first.bending) == ("", None, None)
    assert found.notes == ("No verdict on axial and bending.", "No verdict on axial strength.")


def test_forces_by_load_are_no_demand_until_they_are_combined(e19: Edition) -> None:
    rows = [LoadRow("D", 400_000.0), LoadRow("L", 150_000.0)]
    loose = arrangements(TIED, rows, Context(e19), 3)
    assert any(note.startswith("No verdict on axial strength: Forces are listed by load") for note in loose.notes)
    formed = arrangements(TIED, combined(TIED, rows, "ASCE 7-16"), Context(e19), 3)
    # Hand: 1.2 * 400 + 1.6 * 150 = 720 kip asks for (720/0.52 - 870.4)/56.6 = 9.085 in^2.
    assert formed.found[0].A_st == pytest.approx(9.48)  # 12-#8; 6-#11 with 9.36 in^2 ask for #4 ties
    assert formed.found[0].ratio is not None


def test_what_the_checks_do_not_cover_is_told(e19: Edition) -> None:
    assert arrangements(TIED, LIGHT, Context(e19), 1).notes == ()
    found = arrangements(TIED, [replace(LIGHT[0], T=1_000.0)], Context(e19), 1)
    assert found.notes == ("Not covered by the checks: torsion.",)
    special = arrangements(SPECIAL, BENT, Context(e19), 1)
    assert "No verdict on length l_o, special moment frame: The unsupported length is not stated" in str(special.notes)
    assert any("columns stronger than beams" in note for note in special.notes)


def test_the_largest_ratio_of_strength_governs(e19: Edition) -> None:
    forces = scaled(0.7)
    found = arrangements(SLENDER, forces, Context(e19), 1).found[0]
    results = check(replace(SLENDER, bars=Bars(found.count, found.size, found.n_x, found.n_y)), forces, Context(e19))
    assert found.governing == "second-order moment"
    ratios = {one.check: one.ratio for one in results}
    assert found.ratio == ratios[found.governing] == max(ratios[name] or 0.0 for name in ratios if name in STRENGTH)
    assert found.bending == ratios["axial and bending"]


# Wrong input


@pytest.mark.parametrize("most", [0, -3])
def test_a_list_of_none_is_refused(most: int, e19: Edition) -> None:
    with pytest.raises(RangeError, match=rf"list of arrangements\n +{most} arrangements +1 or more"):
        arrangements(TIED, LIGHT, Context(e19), most)


def test_what_is_wrong_with_the_row_is_told_as_in_its_checks(e19: Edition) -> None:
    with pytest.raises(RangeError, match=r"spiral in a rectangular column") as caught:
        arrangements(replace(TIED, ties=Ties("spiral", 3, 2.0), f_c=400.0), LIGHT, Context(e19))
    assert len(caught.value.problems) == 2
