"""What a row of the anchorage schedule claims and lacks or contradicts: refused, with the clause."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import pytest

from calcpack.aci318.editions import Edition, edition
from calcpack.errors import RangeError
from calcpack.members.anchorage import check
from calcpack.members.termination import Termination

Row = Callable[..., Termination]
JOINT = {"joint": "special", "in_column_core": True}


@pytest.mark.parametrize(
    ("kind", "changes", "message"),
    [
        # Bundles
        ("straight tension", {"bundle": 5}, r"bundle = 5 +1 to 4 bars \(25.6.1.1\)"),
        ("straight tension", {"bundle": 0}, r"bundle = 0 +1 to 4 bars \(25.6.1.1\)"),
        ("hook 90", {"bundle": 2}, r"bundle = 2 +1 for a hook 90: .*\(25.6.1.5, 25.6.1.7\)"),
        ("headed", {"bundle": 3}, r"bundle = 3 +1 for a headed"),
        ("mechanical splice", {"bundle": 3}, r"bundle = 3 +1 for a mechanical splice"),
        ("straight tension", {"bundle": 2, "bar": 14}, r"bar = #14 +#11 and smaller in bundles of beams \(25.6.1.3\)"),
        ("lap tension", {"bundle": 3, "other_bar": 6}, r"bars of one size in a lap within a bundle \(25.6.1.7\)"),
        # Laps of two sizes
        ("hook 90", {"other_bar": 9}, r"other_bar = #9 +blank for hook 90: .*\(25.5.2.2, 25.5.5.4\)"),
        ("lap tension", {"other_bar": 12}, r"other_bar = #12 +one of #3, .*#18 \(ASTM A615, A706\)"),
        ("lap tension", {"other_bar": 14}, r"other_bar = #14 +#11 and smaller \(25.5.1.1\)"),
        ("lap tension", {"bar": 14, "other_bar": 8}, r"bar = #14 +#11 and smaller \(25.5.1.1\)"),
        ("lap compression", {"bar": 18, "other_bar": 14}, r"bar = #18 +#11 and smaller \(25.5.1.1\)"),
        # Class of laps
        ("hook 90", {"spliced": 0.5}, r"spliced = 0.5 +blank for hook 90: .*\(Table 25.5.2.1\)"),
        ("lap tension", {"spliced": 1.5}, r"spliced = 1.5 +a share of the bars.*: write 50% or 0.5"),
        ("lap tension", {"spliced": 0.0}, r"spliced = 0 +a share of the bars, above 0"),
        (
            "lap tension",
            {"lap_class": "A", "spliced": 0.51},
            r"lap_class = A, spliced = 0.51 +class A with half the bars spliced or fewer \(Table 25.5.2.1\): use",
        ),
        (
            "lap tension",
            {"lap_class": "A", "A_s_required": 1.0, "A_s_provided": 1.9, "spliced": 0.5},
            r"lap_class = A, .*class A from twice the area required \(Table 25.5.2.1\)",
        ),
        ("headed", {"bar_stress": 0.4}, r"bar_stress = 0.4 +blank for headed: .*\(10.7.5.2\)"),
        ("lap tension", {"bar_stress": 1.1}, r"bar_stress = 1.1 +tensile stress over f_y, 0 to 1"),
        ("lap tension", {"bar_stress": -0.1}, r"bar_stress = -0.1 +tensile stress over f_y, 0 to 1"),
        ("lap compression", {"bar_stress": 0.01}, r"a tension lap \(10.7.5.2.2\): use kind 'lap tension'"),
        (
            "lap tension",
            {"lap_class": "A", "bar_stress": 0.51},
            r"lap_class = A, bar_stress = 0.51 +class A up to 0.5 f_y \(Table 10.7.5.2.2\): use class B",
        ),
        # Columns
        ("lap tension", {"spiral": True}, r"spiral = yes +no for lap tension: .*\(10.7.5.2.1, Table 25.4.9.3\)"),
        # Joints
        ("hook 90", {"joint": "intermediate"}, r"joint = 'intermediate' +special or blank"),
        ("hook 180", JOINT, r"joint = special +blank for hook 180: .*\(18.8.5.1, 18.8.5.3\)"),
        ("hook 90", {"joint": "special"}, r"joint = special, in_column_core = no +yes: .*\(18.8.5.1\)"),
        ("hook 90", {**JOINT, "bar": 14}, r"joint = special, bar = #14 +#11 and smaller \(18.8.5.1\)"),
        ("straight tension", {**JOINT, "bundle": 2}, r"joint = special, bundle = 2 +1: .*\(18.8.5\)"),
        ("hook 90", {**JOINT, "lamb": 0.85}, r"joint = special, lambda = 0.85 +0.75 or 1 \(18.8.5.1\)"),
        # Supports
        ("straight tension", {"M_n": 1e6}, r"M_n without V_u +M_n and V_u \(9.7.3.8.3\)"),
        ("straight tension", {"V_u": 1e4, "l_a": 6.0}, r"V_u and l_a without M_n +M_n and V_u"),
        ("straight tension", {"confined_reaction": True}, r"confined_reaction without M_n"),
        ("straight tension", {"M_n": 1e6, "V_u": 0.0}, r"V_u = 0 lb +above zero \(9.7.3.8.3\)"),
        ("straight tension", {"M_n": -1.0, "V_u": 1e4}, r"M_n = -1 lb\*in +above zero"),
        (
            "straight tension",
            {"M_n": 1e6, "V_u": 1e4, "l_a": -1.0},
            r"l_a = -1 in +a length, zero or more \(9.7.3.8.3\)",
        ),
        ("hook 90", {"M_n": 1e6, "V_u": 1e4}, r"M_n, V_u +blank for hook 90: .*\(9.7.3.8.3\)"),
        # Excess reinforcement
        ("straight tension", {"excess_exclusion": "none"}, r"excess_exclusion = 'none' +one of .*\(25.4.10.2\)"),
        # Mechanical splices
        ("mechanical splice", {"available": 24.0}, r"available = 24 in +blank: .*\(25.5.7.1\)"),
    ],
)
def test_a_claim_is_refused(kind: str, changes: dict[str, Any], message: str, row: Row, each: Edition) -> None:
    with pytest.raises(RangeError, match=message):
        check(row(kind, **changes), each)


@pytest.mark.parametrize(
    ("kind", "changes"),
    [
        ("straight tension", {"bundle": 4, "bar": 11}),
        ("straight compression", {"bundle": 4, "bar": 14}),
        ("lap compression", {"bar": 14, "other_bar": 11}),
        ("lap tension", {"bar": 11, "other_bar": 10}),
        ("lap tension", {"lap_class": "A", "spliced": 0.5}),
        ("lap tension", {"lap_class": "A", "bar_stress": 0.5}),
        ("lap tension", {"lap_class": "B", "spliced": 1.0}),
        ("lap compression", {"bar_stress": 0.0}),
        ("hook 90", {**JOINT, "bar": 11}),
        ("straight tension", {"M_n": 1e6, "V_u": 1e4, "l_a": 0.0}),
    ],
)
def test_what_stands_on_the_limit_is_worked(kind: str, changes: dict[str, Any], row: Row, each: Edition) -> None:
    ((value, _),) = check(row(kind, **changes), each).values.values()
    assert value is not None
    assert value > 0


# Grades


@pytest.mark.parametrize("f_y", [40_000.0, 60_000.0, 75_000.0, 80_000.0, 60_916.0, 40_611.0, 79_771.0])
def test_grades_of_bars_their_metric_names_among_them(f_y: float, row: Row, each: Edition) -> None:
    # ASTM A615 and A615M from memory: Grade 280 is 40,611 psi, 420 is 60,916 psi, 550 is 79,771 psi.
    assert check(row(f_y=f_y), each).values["l_d"][0] is not None


@pytest.mark.parametrize("f_y", [45_000.0, 58_000.0, 62_000.0, 65_000.0, 70_000.0])
def test_a_grade_outside_the_standards_is_refused(f_y: float, row: Row, each: Edition) -> None:
    message = rf"f_y = {f_y:,.0f} psi +a grade of ASTM A615, A706 or A996: 40,000 psi, .*\(20.2.1.3\): state the grade"
    with pytest.raises(RangeError, match=message):
        check(row(f_y=f_y), each)


def test_a_grade_beyond_the_edition_is_named_once(row: Row, e14: Edition, e19: Edition) -> None:
    check(row(f_y=100_000.0), e19)
    with pytest.raises(RangeError) as caught:
        check(row(f_y=90_000.0), e14)
    assert [problem.given for problem in caught.value.problems] == ["f_y = 90,000 psi"]
    with pytest.raises(RangeError, match=r"f_y = 90,000 psi +a grade of ASTM"):
        check(row(f_y=90_000.0), e19)


@pytest.mark.parametrize(
    ("name", "f_y", "allowed"),
    [("ACI 318-14", 60_000.0, 60_000.0), ("ACI 318-14", 80_000.0, 60_000.0), ("ACI 318-19", 80_000.0, 80_000.0)],
)
def test_grade_in_a_joint(name: str, f_y: float, allowed: float, row: Row) -> None:
    one = row("hook 90", f_y=f_y, **JOINT)
    if f_y <= allowed:
        check(one, edition(name))
    else:
        with pytest.raises(RangeError, match=r"joint = special, f_y = 80,000 psi +allowed up to 60,000 psi"):
            check(one, edition(name))


# Coating and cover


@pytest.mark.parametrize(
    ("changes", "factor"),
    [
        # Clear cover of 3 d_b and clear spacing of 6 d_b for the smaller factor; c_b of 3.5 d_b means both.
        ({"clear_cover": 2.99}, 1.5),
        ({"clear_cover": 3.0}, 1.2),
        ({"clear_spacing": 5.99}, 1.5),
        ({"clear_spacing": 6.0}, 1.2),
        ({"clear_cover": 3.0, "clear_spacing": 6.0}, 1.2),
        ({"clear_cover": 1.5, "clear_spacing": 6.0}, 1.5),
        ({}, 1.2),
        ({"c_b": 3.4}, 1.5),
        ({"c_b": 3.4, "clear_cover": 3.0}, 1.5),
    ],
)
@pytest.mark.parametrize("coating", ["epoxy", "dual"])
def test_cover_or_spacing_that_falls_short_takes_the_larger_coating_factor(
    coating: str, changes: dict[str, Any], factor: float, row: Row, each: Edition
) -> None:
    one = row(**{"coating": coating, "c_b": 3.5, **changes})
    plain = row(**{"c_b": 3.5, **changes})
    ratio = check(one, each).values["l_d"][0] / check(plain, each).values["l_d"][0]
    assert ratio == pytest.approx(factor)


def test_a_c_b_that_the_stated_cover_contradicts_is_not_ok(row: Row, each: Edition) -> None:
    result = check(row(coating="epoxy", c_b=3.5, clear_cover=1.5, available=200.0), each)
    assert (result.verdict, result.ratio is not None) == ("NG", True)
    assert any("c_b" in note for note in result.notes)


def test_all_claims_are_refused_at_once(row: Row, each: Edition) -> None:
    bad = row("hook 90", bundle=3, other_bar=9, spliced=0.5, bar_stress=0.5, spiral=True, M_n=1.0, joint="special")
    with pytest.raises(RangeError) as caught:
        check(bad, each)
    assert len(caught.value.problems) == 9
