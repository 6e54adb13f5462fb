"""Bundles, laps and splices, joints and supports of the anchorage schedule: which equation serves, and what it gives.

Clauses are common practice; numbers are worked by hand from 60000/sqrt(4000) = 948.683.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from calcpack.aci318.editions import EDITIONS, Edition, edition
from calcpack.members.anchorage import check, required_length, work_termination
from calcpack.members.anchorage_splices import class_by_area, class_by_bar_stress, column_splice
from calcpack.members.pad import FloatPad
from calcpack.members.termination import Termination, diameter_of_bundle, termination_of

Row = Callable[..., Termination]
BASE = 60_000.0 / math.sqrt(4_000.0)
NO_8_OF_THREE = math.sqrt(4 * 3 * 0.79 / math.pi)


def length(row: Termination, one: Edition) -> float:
    return required_length(FloatPad(), row, one).value


def notes(row: Termination, one: Edition) -> str:
    return "; ".join(check(row, one).notes)


# Bundles


@pytest.mark.parametrize(("bundle", "factor"), [(1, 1.0), (2, 1.0), (3, 1.2), (4, 1.33)])
@pytest.mark.parametrize("kind", ["straight tension", "straight compression", "lap tension", "lap compression"])
def test_a_bar_of_a_bundle_takes_its_own_length_and_more(
    kind: str, bundle: int, factor: float, row: Row, each: Edition
) -> None:
    # 25.6.1.5 and 25.6.1.7; with cover and spacing not stated the table's other cases serve alone and in a bundle.
    assert length(row(kind, bundle=bundle), each) == pytest.approx(factor * length(row(kind), each))


def test_confinement_of_a_bundle_goes_by_its_diameter(row: Row, each: Edition, steps: Any) -> None:
    # 25.6.1.6: 3 No. 8 count as one bar of 1.737 in: c_b of 2.5 in confines by 1.439, and the length is 1.2 times.
    found = required_length(steps, row(c_b=2.5, bundle=3), each)
    assert found.value == pytest.approx(1.2 * 3 / 40 * BASE / (2.5 / NO_8_OF_THREE))
    assert steps.values["d_be"] == pytest.approx(NO_8_OF_THREE)
    assert steps.values["d_b"] == 1.0
    assert found.clause == {"ACI 318-14": "25.4.2.3a", "ACI 318-19": "25.4.2.4a"}[each.name]


@pytest.mark.parametrize(
    ("cover", "spacing", "coefficient"), [(1.74, 3.48, 20), (1.73, 3.48, 40 / 3), (1.74, 3.4, 40 / 3)]
)
def test_the_table_takes_cover_and_spacing_of_the_bundle(
    cover: float, spacing: float, coefficient: float, row: Row, each: Edition, steps: Any
) -> None:
    # d_be = 1.737 in of cover and twice as much between bundles.
    one = row(bundle=3, clear_cover=cover, clear_spacing=spacing)
    assert required_length(steps, one, each).value == pytest.approx(1.2 * BASE / coefficient)
    assert any("d_be" in text for text in steps.reasons)


def test_coating_of_a_bundle(row: Row, each: Edition, steps: Any) -> None:
    # 3 d_be = 5.21 in of cover: 4 in, enough for a single No. 8, is too little.
    required_length(steps, row(bundle=3, coating="epoxy", clear_cover=4.0, clear_spacing=12.0), each)
    assert steps.values["psi_e"] == 1.5
    assert steps.values["psi_te"] == 1.5


@pytest.mark.parametrize(("c_b", "psi_e"), [(6.1, 1.2), (6.0, 1.5)])
def test_coating_of_a_bundle_by_c_b(c_b: float, psi_e: float, row: Row, each: Edition, steps: Any) -> None:
    # 3.5 d_be = 6.08 in.
    required_length(steps, row(bundle=3, coating="dual", c_b=c_b), each)
    assert steps.values["psi_e"] == psi_e


def test_c_b_of_a_bundle_is_held_against_its_cover(row: Row, each: Edition) -> None:
    # Cover of 1.5 in to a bundle of 1.737 in puts its centre at 2.37 in, 2.39 in with one per cent.
    assert check(row(bundle=3, c_b=2.39, clear_cover=1.5, available=90.0), each).verdict == "OK"
    assert check(row(bundle=3, c_b=2.41, clear_cover=1.5, available=90.0), each).verdict == "NG"
    assert check(row(bundle=3, c_b=2.39, clear_spacing=3.06, available=90.0), each).verdict == "OK"
    assert check(row(bundle=3, c_b=2.39, clear_spacing=2.9, available=90.0), each).verdict == "NG"


def test_excess_reinforcement_counts_before_the_increase(row: Row, each: Edition) -> None:
    areas = {"A_s_required": 3.0, "A_s_provided": 4.0}
    for kind in ("straight tension", "straight compression"):
        assert length(row(kind, bundle=4, **areas), each) == pytest.approx(1.33 * 0.75 * length(row(kind), each))


@pytest.mark.parametrize(("ties", "spiral", "factor"), [(True, False, 0.83), (False, True, 0.75), (True, True, 0.75)])
def test_column_reductions_of_bundles(ties: bool, spiral: bool, factor: float, row: Row, each: Edition) -> None:
    one = row("lap compression", bundle=3, confining_ties=ties, spiral=spiral)
    assert length(one, each) == pytest.approx(1.2 * factor * 30.0)


def test_a_bundle_in_high_grade_is_increased_once(row: Row, e19: Edition) -> None:
    # 25.5.5.1(c): the tension lap of the single bar is compared, and 25.6.1.7 increases the greater of the two.
    alone = row("lap compression", f_y=100_000.0, clear_cover=4.0, clear_spacing=8.0)
    assert length(termination_of(alone, bundle=3), e19) == pytest.approx(1.2 * length(alone, e19))


def test_what_a_bundle_asks_for_beside_its_length(row: Row, each: Edition) -> None:
    assert "enclosed within transverse reinforcement (25.6.1.2)" in notes(row(bundle=2), each)
    assert "25.6.1.7" not in notes(row(bundle=3), each)
    assert "their laps do not overlap (25.6.1.7)" in notes(row("lap tension", bundle=3), each)
    assert diameter_of_bundle(row(bundle=1)) == 1.0


# Class of tension laps


@pytest.mark.parametrize(
    ("times", "spliced", "letter"),
    [(2.0, 0.5, "A"), (1.99, 0.5, "B"), (2.0, 0.51, "B"), (2.1, 1.0, "B"), (3.0, 0.3, "A")],
)
def test_the_class_is_chosen_from_areas_and_share_spliced(
    times: float, spliced: float, letter: str, row: Row, each: Edition, steps: Any
) -> None:
    one = row("lap tension", A_s_required=1.0, A_s_provided=times, spliced=spliced)
    factor = {"A": 1.0, "B": 1.3}[letter]
    assert class_by_area(1.0, times, spliced) == letter
    assert required_length(steps, one, each).value == pytest.approx(factor * length(row(), each))
    assert any(text.startswith(f"Class {letter}: {times:.4g} times the area required") for text in steps.reasons)
    # A bundle takes the same class, by another formula.
    assert length(termination_of(one, bundle=3), each) == pytest.approx(1.2 * factor * length(row(), each))


def test_a_scheduled_class_b_stays(row: Row, each: Edition) -> None:
    one = row("lap tension", A_s_required=1.0, A_s_provided=3.0, spliced=0.5, lap_class="B")
    assert length(one, each) == pytest.approx(1.3 * length(row(), each))


@pytest.mark.parametrize("changes", [{"spliced": 0.5}, {"A_s_required": 1.0, "A_s_provided": 3.0}])
def test_one_of_two_facts_is_not_enough_for_class_a(changes: dict[str, float], row: Row, each: Edition) -> None:
    assert length(row("lap tension", **changes), each) == pytest.approx(1.3 * length(row(), each))


@pytest.mark.parametrize(
    ("stress", "spliced", "letter"),
    [(0.5, 0.5, "A"), (0.51, 0.5, "B"), (0.5, 0.51, "B"), (0.3, None, "B"), (0.0, 0.25, "A"), (0.8, None, "B")],
)
def test_the_class_of_column_bars_goes_by_their_stress(
    stress: float, spliced: float | None, letter: str, row: Row, each: Edition
) -> None:
    one = row("lap tension", bar_stress=stress, spliced=spliced)
    assert class_by_bar_stress(stress, spliced) == letter
    assert length(one, each) == pytest.approx({"A": 1.0, "B": 1.3}[letter] * length(row(), each))
    assert ("staggered by l_d" in notes(one, each)) is (letter == "A")


def test_a_scheduled_class_a_of_column_bars(row: Row, each: Edition, steps: Any) -> None:
    one = row("lap tension", bar_stress=0.4, lap_class="A")
    assert required_length(steps, one, each).value == pytest.approx(length(row(), each))
    assert any(text.startswith("Class A, as scheduled: 0.4 f_y in tension") for text in steps.reasons)


@given(stress=st.floats(0.01, 1.0), spliced=st.floats(0.01, 1.0), name=st.sampled_from(list(EDITIONS)))
def test_the_words_of_a_column_splice_are_those_of_its_formula(stress: float, spliced: float, name: str) -> None:
    one = Termination("P", "lap tension", 8, 4_000.0, 60_000.0, bar_stress=stress, spliced=spliced)
    factor = length(one, edition(name)) / length(
        Termination("P", "straight tension", 8, 4_000.0, 60_000.0), edition(name)
    )
    letter = {1.0: "A", 1.3: "B"}[round(factor, 6)]
    assert column_splice(stress, spliced) == f"tension lap, class {letter}"


def test_bars_in_compression_take_a_compression_lap() -> None:
    assert column_splice(0.0) == column_splice(-0.6, 1.0) == "compression lap"


# Reductions, and where there are none


@pytest.mark.parametrize(
    ("kind", "name", "words"),
    [
        ("lap tension", "ACI 318-14", "not permitted in laps (25.5.1.4)"),
        ("lap compression", "ACI 318-19", "not permitted in laps (25.5.1.4)"),
        ("headed", "ACI 318-14", "not permitted for headed bars (25.4.10.2)"),
        ("headed", "ACI 318-19", "not permitted for headed bars (25.4.10.1)"),
        ("hook 180", "ACI 318-19", "not permitted for hooks (25.4.10.1)"),
        ("mechanical splice", "ACI 318-19", "whatever the area (25.5.7.1)"),
    ],
)
def test_why_a_length_is_not_reduced(kind: str, name: str, words: str, row: Row) -> None:
    areas = {"A_s_required": 3.0, "A_s_provided": 4.0}
    assert words in notes(row(kind, **areas), edition(name))
    assert length(row(kind, **areas), edition(name)) == length(row(kind), edition(name))


def test_trap_no_excess_reduction_inside_a_lap_whose_class_goes_by_the_areas(row: Row, each: Edition) -> None:
    one = row("lap tension", A_s_required=1.0, A_s_provided=4.0, spliced=0.5)
    assert length(one, each) == pytest.approx(length(row(), each))
    assert "No reduction for excess reinforcement: not permitted in laps" in notes(one, each)


@pytest.mark.parametrize(
    ("exclusion", "words"),
    [
        ("noncontinuous support", "the bars end at a noncontinuous support"),
        ("f_y required", "the bars have to be developed for f_y"),
        ("continuous bars", "the bars have to be continuous"),
        ("seismic", "the bars belong to the seismic-force-resisting system"),
    ],
)
@pytest.mark.parametrize("kind", ["straight tension", "straight compression"])
def test_exclusions_rule_out_the_reduction(kind: str, exclusion: str, words: str, row: Row, each: Edition) -> None:
    areas = {"A_s_required": 3.0, "A_s_provided": 4.0}
    assert length(row(kind, **areas), each) == pytest.approx(0.75 * length(row(kind), each))
    excluded = row(kind, **areas, excess_exclusion=exclusion)
    assert length(excluded, each) == length(row(kind), each)
    assert f"{words} (25.4.10.2)" in notes(excluded, each)


def test_an_exclusion_holds_for_hooks_of_318_14(row: Row, e14: Edition) -> None:
    areas = {"A_s_required": 3.0, "A_s_provided": 4.0}
    assert length(row("hook 90", **areas, excess_exclusion="seismic"), e14) == length(row("hook 90"), e14)


@pytest.mark.parametrize(("changes", "factor"), [({}, 1.0), ({"spiral": True}, 0.75), ({"confining_ties": True}, 0.83)])
def test_compression_laps_in_columns(changes: dict[str, bool], factor: float, row: Row, each: Edition) -> None:
    # 10.7.5.2.1; 25.5.5.1: 0.0005*60000 = 30 diameters.
    assert length(row("lap compression", **changes), each) == pytest.approx(30.0 * factor)
    # 12 in stays: No. 4 laps 15 in, 11.25 in within a spiral.
    small = length(row("lap compression", bar=4, **changes), each)
    assert small == pytest.approx(max(15.0 * factor, 12.0))


def test_a_spiral_counts_in_compression_as_close_ties_do(row: Row, each: Edition) -> None:
    spiral = length(row("straight compression", spiral=True), each)
    assert spiral == length(row("straight compression", confining_ties=True), each)


# Bars of two sizes


def test_a_tension_lap_of_two_sizes(row: Row, each: Edition, steps: Any) -> None:
    # 25.5.2.2: development of the No. 9, or the class B lap of the No. 6; other cases of the table, coefficient 3/40
    # for the larger and 3/50 for the smaller bar.
    developed, lapped = 3 / 40 * BASE * 1.128, 1.3 * 3 / 50 * BASE * 0.75
    assert developed > lapped
    found = required_length(steps, row("lap tension", bar=6, other_bar=9), each)
    assert found.value == pytest.approx(developed)
    assert (found.symbol, found.clause) == ("l_st", "25.5.2.2")
    assert length(row("lap tension", bar=9, other_bar=6), each) == found.value
    assert [text for text in steps.reasons if text.startswith(("Larger", "Smaller"))] == [
        "Larger bar, #9: developed.",
        "Smaller bar, #6: lapped.",
    ]


def test_the_smaller_bar_may_govern_a_tension_lap(row: Row, each: Edition) -> None:
    # No. 8 and No. 9: 1.3*71.15*1.0 against 71.15*1.128.
    assert length(row("lap tension", bar=8, other_bar=9), each) == pytest.approx(1.3 * 3 / 40 * BASE)


def test_a_compression_lap_of_two_sizes(row: Row, each: Edition) -> None:
    # 25.5.5.4: No. 14 developed, 60000/(50 sqrt(4000))*1.693 = 32.12 in, against No. 8 lapped, 30 in.
    assert length(row("lap compression", bar=8, other_bar=14), each) == pytest.approx(BASE / 50 * 1.693)
    assert length(row("lap compression", bar=14, other_bar=8), each) == pytest.approx(BASE / 50 * 1.693)
    assert length(row("lap compression", bar=8, other_bar=7), each) == pytest.approx(0.0005 * 60_000 * 0.875)


def test_ties_of_a_lap_do_not_shorten_the_development_of_its_larger_bar(row: Row, each: Edition) -> None:
    # 0.0015 h s is not the condition of Table 25.4.9.3; a spiral is in both.
    assert length(row("lap compression", bar=8, other_bar=14, confining_ties=True), each) == pytest.approx(
        32.1224, 1e-4
    )
    assert length(row("lap compression", bar=8, other_bar=14, spiral=True), each) == pytest.approx(0.75 * 32.1224, 1e-4)


def test_the_same_size_twice_is_a_lap_of_one_size(row: Row, each: Edition, steps: Any) -> None:
    one = row("lap tension", other_bar=8, available=100.0)
    assert check(one, each) == check(row("lap tension", available=100.0), each)
    work_termination(steps, row("lap tension", bar=8, other_bar=6, available=100.0), each)
    assert steps.verdicts[-1].what == "T1: tension lap of #8 and #6 bars within the length available"


def test_excess_reinforcement_does_not_shorten_a_lap_of_two_sizes(row: Row, each: Edition) -> None:
    areas = {"A_s_required": 1.0, "A_s_provided": 4.0}
    one = row("lap tension", bar=6, other_bar=11, **areas)
    assert length(one, each) == length(row("lap tension", bar=6, other_bar=11), each)
    assert "not permitted in laps" in notes(one, each)


# Mechanical splices


def test_a_mechanical_splice_asks_for_a_force(row: Row, each: Edition) -> None:
    # 25.5.7.1: 1.25*60 ksi*0.79 in^2 = 59.25 kip.
    result = check(row("mechanical splice"), each)
    value, unit = result.values["P_splice"]
    assert (result.clause, result.ratio, result.verdict, unit) == ("25.5.7.1", None, "", "kip")
    assert value == pytest.approx(59.25)


# Joints of special moment frames

JOINT = {"joint": "special", "in_column_core": True}


@pytest.mark.parametrize(
    ("kind", "changes", "factor"),
    [
        ("hook 90", {}, 1.0),
        ("hook 90", {"top": True}, 1.0),
        ("hook 90", {"coating": "epoxy"}, 1.2),
        ("hook 90", {"lamb": 0.75}, 1 / 0.75),
        ("hook 90", {"side_cover": 3.0, "tail_cover": 3.0, "confining_ties": True}, 1.0),
        ("straight tension", {}, 2.5),
        ("straight tension", {"top": True}, 3.25),
        ("straight tension", {"coating": "epoxy"}, 3.75),
    ],
)
def test_bars_in_the_joint_of_a_special_frame(
    kind: str, changes: dict[str, Any], factor: float, row: Row, each: Edition
) -> None:
    # 18.8.5.1: 60000/(65 sqrt(4000)); no other reduction; 18.8.5.3 for straight bars.
    result = check(row(kind, **JOINT, **changes), each)
    ((_, (value, _)),) = result.values.items()
    assert value == pytest.approx(factor * BASE / 65)
    assert result.clause == "18.8.5.1"


def test_no_excess_reduction_in_a_joint(row: Row, e14: Edition) -> None:
    one = row("hook 90", A_s_required=3.0, A_s_provided=4.0, **JOINT)
    assert length(one, e14) == length(row("hook 90", **JOINT), e14)
    assert "seismic-force-resisting system (25.4.10.2)" in notes(one, e14)


def test_a_straight_bar_through_a_joint_says_what_counts_outside(row: Row, each: Edition) -> None:
    assert "(18.8.5.4)" in notes(row(**JOINT), each)
    assert "(18.8.5.4)" not in notes(row("hook 90", **JOINT), each)


# Simple supports and points of inflection


@pytest.mark.parametrize(
    ("l_a", "confined", "met"),
    [
        (1.5, True, True),
        (1.4, True, False),
        (9.0, False, False),
        (9.43, False, False),
        (9.45, False, True),
        (None, True, False),
    ],
)
def test_bars_at_a_simple_support(l_a: float | None, confined: bool, met: bool, row: Row, each: Edition) -> None:
    # First row of the table: l_d = 60000/(20 sqrt(4000)) = 47.434 in; M_n/V_u = 38 in, or 45.95 in with its 1.3.
    spaced = {"clear_cover": 2.0, "clear_spacing": 4.0, "available": 60.0}
    M_n = 38.0 * 80_000.0 if not confined else (45.95 / 1.3) * 80_000.0
    one = row(**spaced, M_n=M_n, V_u=80_000.0, l_a=l_a, confined_reaction=confined)
    result = check(one, each)
    assert result.verdict == ("OK" if met else "NG")
    clause = "9.7.3.8.3(a)" if confined else "9.7.3.8.3(b)"
    assert any(clause in note for note in result.notes)
    assert result.ratio == pytest.approx(47.434165 / 60.0)


def test_an_embedment_not_stated_is_not_counted(row: Row, each: Edition, steps: Any) -> None:
    work_termination(steps, row(M_n=2_400_000.0, V_u=80_000.0), each)
    assert steps.values["l_a"] == 0.0
    assert steps.source("l_a") == "no embedment counted, default of the schedule"
    assert steps.verdicts[0].capacity == pytest.approx(30.0)
    assert steps.words == ["NG"]


# Every step


@pytest.mark.parametrize(
    "changes",
    [
        {"bundle": 4, "c_b": 3.0, "clear_cover": 3.0},
        {"kind": "lap tension", "bundle": 3, "clear_spacing": 5.0, "c_b": 3.0},
        {"kind": "lap tension", "spliced": 0.5, "bar_stress": 0.4},
        {"kind": "hook 90", **JOINT},
        {"M_n": 2_400_000.0, "V_u": 80_000.0, "l_a": 6.0, "confined_reaction": True},
        {"kind": "mechanical splice"},
    ],
)
def test_every_step_cites_the_edition_and_nothing_is_given_twice(
    changes: dict[str, Any], row: Row, each: Edition, steps: Any
) -> None:
    work_termination(steps, row(**changes), each)
    for _, formula in steps.clauses:
        assert formula.clause(each.standard).standard in (each.standard, None)
    symbols = [item.symbol for item in steps.givens]
    assert len(symbols) == len(set(symbols))
