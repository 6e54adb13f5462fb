"""What is refused in a row of the anchorage schedule, with the words a user reads."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import pytest

from calcpack.aci318.editions import Edition, edition
from calcpack.errors import RangeError
from calcpack.members.anchorage import check
from calcpack.members.termination import Termination

Row = Callable[..., Termination]


@pytest.mark.parametrize(
    ("kind", "changes", "message"),
    [
        ("hook", {}, r"kind = 'hook' +one of straight tension, hook 90, hook 180, headed"),
        ("hook 90", {"coating": "paint"}, r"coating = 'paint' +one of none, epoxy, zinc, dual"),
        ("lap tension", {"lap_class": "C"}, r"lap_class = 'C' +A, B or blank"),
        ("hook 90", {"bar": 12}, r"bar = #12 +one of #3, #4, .*#18 \(ASTM A615, A706\)"),
        ("headed", {"bar": 14}, r"bar = #14 +#11 and smaller \(25.4.4.1\)"),
        ("lap tension", {"bar": 14}, r"bar = #14 +#11 and smaller \(25.5.1.1\)"),
        ("lap compression", {"bar": 18}, r"bar = #18 +#11 and smaller \(25.5.1.1\)"),
        ("hook 90", {"f_c": 2_499.0}, r"f_c = 2,499 psi +allowed 2,500 psi and up"),
        ("hook 90", {"f_c": 4.0}, r"was this meant to be 4,000 psi\?"),
        ("hook 90", {"f_c": float("nan")}, r"f_c = nan psi +allowed 2,500 psi and up"),
        ("hook 90", {"f_y": 60.0}, r"f_y = 60 psi +allowed 40,000 psi and up .*: was this meant to be 60,000 psi\?"),
        ("straight tension", {"lamb": 1.1}, r"lambda = 1.1"),
        ("lap compression", {"lamb": 7.0}, r"lambda = 7 +allowed 0.75 to 1 \(ACI 318-.. 19.2.4\)"),
        ("hook 90", {"lamb": 0.85}, r"lambda = 0.85 +one of 0.75, 1 \(ACI 318-.. Table 25.4.3.2\)"),
        ("headed", {"lamb": 0.75}, r"lambda = 0.75 +one of 1 \(ACI 318-.. 25.4.4.1, normalweight concrete\)"),
        ("hook 90", {"available": 0.0}, r"available = 0 in +a length above zero"),
        ("hook 90", {"side_cover": -1.0}, r"side_cover = -1 in +a length above zero"),
        ("straight tension", {"K_tr": -0.1}, r"K_tr = -0.1 in +a length, zero or more"),
        ("straight tension", {"c_b": 0.5}, r"c_b = 0.5 in +above d_b/2 = 0.5 in: it runs to the bar centre"),
        ("straight tension", {"A_s_required": 1.0}, r"A_s_provided is blank +both areas or neither \(25.4.10.1\)"),
        ("straight tension", {"A_s_provided": 1.0}, r"A_s_required is blank"),
        (
            "straight tension",
            {"A_s_required": 2.0, "A_s_provided": 1.0},
            r"A_s_required = 2 in\^2, A_s_provided = 1 in\^2 +above zero, and not more required than provided",
        ),
    ],
)
def test_a_problem_is_named(kind: str, changes: dict[str, Any], message: str, row: Row, each: Edition) -> None:
    with pytest.raises(RangeError, match=message):
        check(row(kind, **changes), each)


@pytest.mark.parametrize(
    ("kind", "name", "f_y", "message"),
    [
        ("straight tension", "ACI 318-14", 80_001.0, r"up to 80,000 psi \(ACI 318-14 Table 20.2.2.4a\)"),
        ("straight tension", "ACI 318-19", 100_001.0, r"up to 100,000 psi \(ACI 318-19 Table 20.2.2.4a\)"),
        ("headed", "ACI 318-14", 60_001.0, r"up to 60,000 psi \(ACI 318-14 25.4.4.1\)"),
        ("headed", "ACI 318-19", 100_001.0, r"up to 100,000 psi \(ACI 318-19 25.4.4.1\)"),
    ],
)
def test_largest_yield_strength_by_edition(kind: str, name: str, f_y: float, message: str, row: Row) -> None:
    check(row(kind, f_y=f_y - 1.0), edition(name))
    with pytest.raises(RangeError, match=message):
        check(row(kind, f_y=f_y), edition(name))


def test_lightweight_by_test_holds_for_straight_bars_of_318_14_only(row: Row, e14: Edition, e19: Edition) -> None:
    # From memory: 318-14 Table 25.4.2.4 admits lambda from a splitting test, 318-19 Table 25.4.2.5 has 0.75 and 1.0.
    check(row(lamb=0.85), e14)
    check(row(lamb=0.75), e19)
    with pytest.raises(RangeError, match=r"lambda = 0.85 +one of 0.75, 1 \(ACI 318-19 Table 25.4.2.5\)"):
        check(row(lamb=0.85), e19)


def test_all_problems_of_a_row_come_at_once_with_its_place(row: Row, e14: Edition) -> None:
    bad = row("headed", bar=14, f_c=40.0, f_y=60.0, available=0.0, file="inputs/anchorage.csv", row=7)
    with pytest.raises(RangeError) as caught:
        check(bad, e14)
    assert len(caught.value.problems) == 4
    assert str(caught.value).endswith("inputs/anchorage.csv, row 7")
    assert str(caught.value).startswith("T1: headed")


def test_a_coated_bar_with_c_b_needs_no_cover(row: Row, each: Edition) -> None:
    assert check(row(coating="epoxy", c_b=2.0), each).values["l_d"][0] > 0


def test_a_compression_lap_of_high_grade_needs_what_the_tension_lap_needs(row: Row, e19: Edition) -> None:
    # ACI 318-19 25.5.5.1(c), from memory.
    with pytest.raises(RangeError, match=r"lambda = 0.85 +one of 0.75, 1 \(ACI 318-19 Table 25.4.2.5\)"):
        check(row("lap compression", f_y=100_000.0, lamb=0.85), e19)
    assert check(row("lap compression", coating="epoxy", lamb=0.85), e19).values["l_sc"] == (30.0, "in")
