"""Checks of a column: which there are, axial strength, bars, ties, spirals, and what is owed beside them."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import pytest

from calcpack.aci318.editions import Edition
from calcpack.errors import RangeError
from calcpack.members.column import Context, check, owed, work_column
from calcpack.members.column_rules import ColumnWorking
from calcpack.members.column_section import Bars, Column, Force, Ties
from calcpack.members.pad import FloatPad
from calcpack.members.results import CheckResult

TIED = Column("C1", 16.0, 16.0, Bars(8, 9, 3, 3), Ties("ties", 3, 16.0), 1.5, 4_000.0, 60_000.0)
# The column of col-spiral-civl4135.
ROUND = Column("C2", None, 21.5, Bars(12, 7), Ties("spiral", 3, 2.0), 1.5, 3_000.0, 40_000.0, aggregate=0.75)
FORCES = [Force("1.4D", 300_000.0), Force("1.2D+1.6L", 690_000.0), Force("0.9D+1.0W", -20_000.0)]


def by_name(results: list[CheckResult]) -> dict[str, CheckResult]:
    return {result.check: result for result in results}


def one(column: Column, name: str, edition: Edition) -> CheckResult:
    return by_name(check(column, FORCES, Context(edition)))[name]


def test_checks_of_a_tied_column(each: Edition) -> None:
    assert list(by_name(check(TIED, FORCES, Context(each)))) == [
        *["axial and bending", "axial strength", "reinforcement ratio", "number of bars", "bar spacing"],
        *["tie size", "tie spacing", "lateral support of bars"],
    ]


def test_checks_of_a_spiral_column(each: Edition) -> None:
    assert list(by_name(check(ROUND, FORCES, Context(each))))[5:] == ["spiral size", "spiral pitch", "spiral ratio"]


def names(column: Column, forces: list[Force], edition: Edition) -> list[str]:
    """Names of the checks beyond those of a short column that is compressed."""
    short = by_name(check(replace(column, l_u=None, seismic="none"), FORCES, Context(edition)))
    return [name for name in by_name(check(column, forces, Context(edition))) if name not in short]


SHEARED = [Force("1.2D+1.0W", 200_000.0, Vx=9_000.0, Vy=4_000.0)]
OF_SHEAR = ["shear", "section in shear", "minimum shear reinforcement", "spacing of shear reinforcement"]


def test_checks_of_a_slender_column(each: Edition) -> None:
    # Hand: 18 ft over 0.3 * 16 in are 45, above the 40 that is the largest limit of a braced column.
    assert names(replace(TIED, l_u=216.0), FORCES, each) == ["stability", "second-order moment"]
    # 8 ft are 20, below the 22 of a column in single curvature.
    assert names(replace(TIED, l_u=96.0), FORCES, each) == ["slenderness"]


def test_checks_of_a_column_in_shear(e14: Edition, e19: Edition) -> None:
    both = [f"{name}, {axis}" for axis in "xy" for name in OF_SHEAR]
    # ACI 318-19 22.5.1.10, from memory: shear along both axes is combined; 318-14 has no such rule.
    assert names(TIED, SHEARED, e19) == [*both, "biaxial shear"]
    assert names(TIED, SHEARED, e14) == both
    assert names(ROUND, SHEARED, e19) == OF_SHEAR


def test_checks_of_a_column_of_a_special_frame_come_last(each: Edition) -> None:
    found = list(by_name(check(replace(TIED, seismic="special"), SHEARED, Context(each))))
    special = [name for name in found if name.endswith(", special moment frame")]
    assert len(special) > 5
    assert found[-len(special) :] == special
    assert found[: -len(special)] == list(by_name(check(TIED, SHEARED, Context(each))))


def test_axial_strength_of_a_tied_column(each: Edition) -> None:
    # Hand: P_o = 0.85 * 4 * (256 - 8) + 60 * 8 = 1323.2 kip, phi P_n,max = 0.52 * 1323.2 = 688.064 kip.
    result = one(TIED, "axial strength", each)
    assert result.values["P_o"] == (pytest.approx(1_323.2), "kip")
    assert result.values["phi_P_n_max"] == (pytest.approx(688.064), "kip")
    assert result.combination == "1.2D+1.6L"
    assert result.ratio == pytest.approx(690.0 / 688.064)
    assert (result.verdict, result.clause) == ("NG", "22.4.2")


def test_axial_strength_of_a_spiral_column(each: Edition) -> None:
    # Hand: 0.75 * 0.85 of 0.85 * 3 * (363.05 - 7.2) + 40 * 7.2 = 1195.42 kip.
    assert one(ROUND, "axial strength", each).values["phi_P_n_max"][0] == pytest.approx(0.6375 * 1_195.418, rel=1e-5)


def test_axial_strength_without_forces_has_no_verdict(each: Edition) -> None:
    result = by_name(check(TIED, [], Context(each)))["axial strength"]
    assert (result.ratio, result.verdict, result.combination) == (None, "", "")


def test_tension_is_not_a_demand_on_axial_strength(each: Edition) -> None:
    result = by_name(check(TIED, [Force("uplift", -50_000.0)], Context(each)))["axial strength"]
    assert (result.ratio, result.verdict) == (0.0, "OK")


def test_high_grade_bars_count_up_to_80_ksi(e14: Edition, e19: Edition, steps: Any) -> None:
    # ACI 318-19 22.4.2.1, from memory. Hand: 0.85 * 4 * 248 + 80 * 8 = 1483.2 kip.
    high = replace(TIED, f_y=100_000.0)
    work_column(steps, high, [], Context(e19))
    assert steps.values["P_o"] == pytest.approx(1_483_200.0)
    assert steps.reasons.count("Bars above Grade 80 (ACI 318-19 22.4.2.1).") == 1
    assert one(high, "axial and bending", e19).values["P_o"] == (pytest.approx(1_483.2), "kip")
    with pytest.raises(RangeError, match=r"f_y = 100,000 psi +allowed up to 80,000 psi \(ACI 318-14 Table 20.2.2.4a\)"):
        check(high, FORCES, Context(e14))


def test_steps_of_the_axial_strength(each: Edition, steps: Any) -> None:
    work_column(steps, TIED, [], Context(each))
    assert [name for kind, name in steps.under("Axial strength") if kind == "worked"] == [
        *["A_g", "A_st", "P_o", "P_n_max", "phi", "phi_P_n_max"]
    ]


@pytest.mark.parametrize(
    ("b", "ratio", "verdict"),
    [(16.0, 0.390625, "OK"), (10.0, 0.625, "OK"), (50.0, 1.0, "OK"), (51.0, 1.02, "NG")],
)
def test_reinforcement_ratio(b: float, ratio: float, verdict: str, each: Edition) -> None:
    # ACI 318 10.6.1.1; A_st = 8 in^2, h = 16 in: rho_g/0.08, or 0.01/rho_g where that is more.
    result = one(replace(TIED, b=b), "reinforcement ratio", each)
    assert (result.ratio, result.verdict) == (pytest.approx(ratio), verdict)


def test_reinforcement_above_eight_per_cent(each: Edition) -> None:
    heavy = replace(TIED, bars=Bars(8, 18, 3, 3), b=19.0, h=19.0, ties=Ties("ties", 4, 12.0))
    result = one(heavy, "reinforcement ratio", each)
    assert result.ratio == pytest.approx(32.0 / 361.0 / 0.08)
    assert result.verdict == "NG"


def test_number_of_bars(each: Edition) -> None:
    assert one(replace(TIED, bars=Bars(4, 9, 2, 2)), "number of bars", each).ratio == 1.0
    assert one(replace(ROUND, bars=Bars(6, 9)), "number of bars", each).verdict == "OK"
    assert one(replace(ROUND, bars=Bars(5, 9)), "number of bars", each).verdict == "NG"
    circular_ties = replace(ROUND, ties=Ties("ties", 3, 9.0), bars=Bars(3, 11))
    assert one(circular_ties, "number of bars", each).verdict == "NG"


def test_bar_spacing(each: Edition) -> None:
    # Hand: (16 - 2 * 1.875 - 3 * 1.128)/2 = 4.433 in; 1.5 d_b = 1.692 in.
    result = one(TIED, "bar spacing", each)
    assert result.values["s_clear"][0] == pytest.approx(4.433)
    assert result.ratio == pytest.approx(1.692 / 4.433)
    assert result.notes == ("Aggregate size not stated: 4/3 d_agg is not checked.",)
    assert one(replace(TIED, aggregate=1.5), "bar spacing", each).values["s_clear_min"][0] == pytest.approx(2.0)


def test_bars_that_touch_are_ng_without_a_ratio(each: Edition) -> None:
    # Hand: 2 (1.5 + 0.375) + 7 * 1.41 = 13.62 in take seven bars that touch.
    result = one(replace(TIED, bars=Bars(24, 11, 7, 7), b=13.62), "bar spacing", each)
    assert (result.ratio, result.verdict) == (None, "NG")


def test_closest_face_governs_bar_spacing(each: Edition) -> None:
    along_x, along_y = ColumnWorking(FloatPad(), replace(TIED, b=12.0, bars=Bars(10, 9, 2, 5)), each).faces
    assert (along_x.n_face, along_y.n_face) == (2, 5)
    assert along_y.s_clear == pytest.approx((16 - 3.75 - 5 * 1.128) / 4)


@pytest.mark.parametrize(("bar", "tie", "verdict"), [(10, 3, "OK"), (11, 3, "NG"), (11, 4, "OK")])
def test_tie_size(bar: int, tie: int, verdict: str, each: Edition) -> None:
    column = replace(TIED, bars=Bars(8, bar, 3, 3), ties=Ties("ties", tie, 12.0))
    assert one(column, "tie size", each).verdict == verdict


@pytest.mark.parametrize(("spacing", "verdict"), [(16.0, "OK"), (16.1, "NG")])
def test_tie_spacing(spacing: float, verdict: str, each: Edition) -> None:
    # Hand: least of 16 * 1.128 = 18.05, 48 * 0.375 = 18 and 16 in.
    result = one(replace(TIED, ties=Ties("ties", 3, spacing)), "tie spacing", each)
    assert result.values["s_max"] == (16.0, "in")
    assert result.verdict == verdict


def test_ties_closer_than_the_aggregate_passes(each: Edition) -> None:
    # ACI 318 25.7.2.1: clear 4/3 of 1.5 in = 2 in against 2.375 - 0.375 = 2 in.
    fine = replace(TIED, aggregate=1.5, ties=Ties("ties", 3, 2.375))
    assert one(fine, "tie spacing", each).ratio == pytest.approx(1.0)
    assert one(replace(fine, ties=Ties("ties", 3, 2.3)), "tie spacing", each).verdict == "NG"


def test_lateral_support_of_middle_bars(each: Edition) -> None:
    # ACI 318 25.7.2.3: a middle bar of three may stand unsupported within 6 in clear.
    assert one(TIED, "lateral support of bars", each).ratio == pytest.approx(4.433 / 6.0)
    corners = one(replace(TIED, bars=Bars(4, 9, 2, 2)), "lateral support of bars", each)
    assert (corners.ratio, corners.verdict) == (0.0, "OK")


@pytest.mark.parametrize("column", [replace(TIED, b=24.0), replace(TIED, bars=Bars(10, 9, 4, 3))])
def test_bars_that_need_crossties_are_left_open(column: Column, each: Edition) -> None:
    result = one(column, "lateral support of bars", each)
    assert (result.ratio, result.verdict) == (None, "")
    assert result.notes == ("Bars between the corners along x need crossties; the schedule does not show any.",)


@pytest.mark.parametrize(
    ("pitch", "verdict"), [(1.375, "OK"), (1.37, "NG"), (3.375, "OK"), (3.38, "NG"), (0.376, "NG")]
)
def test_spiral_pitch(pitch: float, verdict: str, each: Edition) -> None:
    # ACI 318 25.7.3.1: clear 1 to 3 in; a No. 3 spiral takes 0.375 in of the pitch.
    result = one(replace(ROUND, ties=Ties("spiral", 3, pitch), aggregate=None), "spiral pitch", each)
    assert result.verdict == verdict
    assert result.notes == ("Aggregate size not stated: 4/3 d_agg is not checked.",)


def test_spiral_pitch_with_large_aggregate(each: Edition) -> None:
    result = one(replace(ROUND, aggregate=1.5), "spiral pitch", each)
    assert result.ratio == pytest.approx(2.0 / 1.625)


def test_trap_spiral_ratio_along_the_centre_line_fails_where_the_simplified_one_passes(each: Edition) -> None:
    # col-spiral-civl4135, published: 0.01165 against a minimum of 0.0118.
    result = one(ROUND, "spiral ratio", each)
    assert result.verdict == "NG"
    assert result.values["rho_s"][0] == pytest.approx(0.01165, rel=5e-4)
    assert result.notes[0] == "A turn is measured along its centre line, pi (D_c - d_bt)."
    assert result.notes[1] == "f_yt is taken as f_y: the schedule states no other."
    assert one(replace(ROUND, f_yt=60_000.0), "spiral ratio", each).verdict == "OK"


def test_spiral_size(each: Edition) -> None:
    assert one(ROUND, "spiral size", each).ratio == 1.0


@pytest.mark.parametrize(
    ("changes", "message"),
    [
        ({"f_c": 4.0}, r"f_c = 4 psi +allowed 2,500 psi and up"),
        ({"f_y": 60.0}, r"f_y = 60 psi +allowed 40,000 psi and up"),
        ({"f_yt": 100_001.0}, r"f_yt = 100,001 psi +allowed up to 100,000 psi \(ACI 318-.. 25.7.3.3\)"),
        ({"b": 0.0}, r"b = 0 in +a length above zero"),
        ({"cover": -1.0}, r"cover = -1 in +a length above zero"),
        ({"bars": Bars(8, 12, 3, 3)}, r"bars: #12 +one of #3"),
        ({"ties": Ties("ties", 2, 9.0)}, r"ties: #2 +one of #3"),
        ({"bars": Bars(9, 9, 3, 3)}, r"bars: 9 in a layout of 3 x 3 +8 stand around it"),
        ({"bars": Bars(2, 9, 1, 3)}, r"bars: 1 x 3 along the faces +2 or more along each face"),
        ({"bars": Bars(8, 9)}, r"bars: None x None along the faces"),
        ({"b": None, "bars": Bars(2, 9)}, r"bars: 2 on a circle +3 or more"),
        ({"ties": Ties("ties", 3, 0.375)}, r"ties: #3 at 0.375 in +a spacing above the diameter of the bar, 0.375 in"),
        ({"b": None, "bars": Bars(6, 9), "ties": Ties("spiral", 4, 0.3)}, r"spiral: #4 at 0.3 in +a spacing above"),
        ({"ties": Ties("spiral", 3, 2.0)}, r"spiral in a rectangular column .*: use ties"),
        ({"b": 6.0}, r"6 in across +more than cover, ties and bars take: 6.006 in"),
    ],
)
def test_impossible_columns_are_refused(changes: dict[str, Any], message: str, each: Edition) -> None:
    with pytest.raises(RangeError, match=message):
        check(replace(TIED, **changes), FORCES, Context(each))


def test_all_problems_of_a_column_come_at_once(each: Edition) -> None:
    bad = replace(TIED, f_c=4.0, f_y=60.0, cover=0.0, file="inputs/columns.csv", row=3)
    with pytest.raises(RangeError, match=r"(?s)column C1.*inputs/columns.csv, row 3") as caught:
        check(bad, FORCES, Context(each))
    assert len(caught.value.problems) == 3


# What was an open item once is among the checks.
ENDS = Force("a", 1.0, My=None, My_bottom=1.0, My_top=2.0)


@pytest.mark.parametrize(
    ("column", "force", "name"),
    [
        (TIED, Force("a", 1.0, Mx=2.0), "axial and bending"),
        (TIED, ENDS, "axial and bending"),
        (TIED, Force("a", -1.0), "axial and bending"),
        (replace(TIED, l_u=144.0), Force("a", 1.0), "slenderness"),
        (TIED, Force("a", 1.0, Vy=3.0), "shear, y"),
        (replace(TIED, seismic="special"), Force("a", 1.0), "confinement, x, special moment frame"),
    ],
)
def test_what_is_covered_is_not_owed(column: Column, force: Force, name: str, each: Edition) -> None:
    result = {one.check.replace("stability", "slenderness"): one for one in check(column, [force], Context(each))}[name]
    assert (result.ratio or 0.0) > 0
    assert result.verdict
    assert not any("bending" in text or "slender" in text or text == "shear" for text in owed(column, [force]))


@pytest.mark.parametrize(
    ("column", "forces", "expected"),
    [
        (TIED, [], []),
        (TIED, [Force("a", 1.0, Mx=2.0, Vy=3.0)], []),
        (replace(TIED, l_u=144.0), [Force("a", -1.0)], []),
        (TIED, [Force("a", 1.0, T=3.0)], ["torsion"]),
        (TIED, [Force("a", 1.0), Force("b", 1.0, T=-3.0)], ["torsion"]),
    ],
)
def test_what_is_owed(column: Column, forces: list[Force], expected: list[str]) -> None:
    assert owed(column, forces) == expected


def test_a_special_frame_owes_more() -> None:
    special = replace(TIED, seismic="special")
    found = owed(special, [Force("a", 1.0, T=3.0)])
    assert found[0] == "torsion"
    assert any("(18.7.3)" in text for text in found)
    assert owed(special, []) == found[1:]


def test_the_stiffness_that_was_asked_for_is_taken(each: Edition) -> None:
    # 6.6.4.4.4 (b) counts the bars: another critical load, hence another ratio of stability.
    slender = replace(TIED, l_u=216.0)
    found = {
        rule: by_name(check(slender, FORCES, Context(each, stiffness=rule)))["stability"].ratio for rule in ("a", "b")
    }
    assert check(slender, FORCES, Context(each)) == check(slender, FORCES, Context(each, stiffness="a"))
    # Hand: E_s I_se/(E_c I_g) = 29,000 * 6 * 5.561^2/(3,605 * 16^4/12) = 0.2733, so (b) has 0.4733 in place of 0.4.
    assert found["a"] == pytest.approx((found["b"] or 0.0) * 0.4733 / 0.4, rel=1e-3)


@pytest.mark.parametrize(("b", "h"), [(10.0, 30.0), (30.0, 10.0)])
def test_least_dimension_limits_the_tie_spacing(b: float, h: float, each: Edition) -> None:
    narrow = replace(TIED, b=b, h=h, bars=Bars(4, 9, 2, 2), ties=Ties("ties", 3, 10.0))
    assert one(narrow, "tie spacing", each).values["s_max"] == (10.0, "in")


def test_bars_that_just_touch_are_ng(each: Edition) -> None:
    # Hand: 2 * (1.5 + 0.375) + 3 * 1 = 6.75 in.
    touching = replace(TIED, b=6.75, bars=Bars(8, 8, 3, 3))
    result = one(touching, "bar spacing", each)
    assert (result.ratio, result.verdict) == (None, "NG")
