"""Bars and standards. Dimensions are compared with a published table in tests/published/bars.toml."""

from __future__ import annotations

import math

import pytest

from calcpack.aci318.bars import BARS, GRADES, NO_11, Bar, bar, standards_of_grade
from calcpack.aci318.standards import ACI_318_14, ACI_318_19, ASTM_A615, ASTM_A706
from calcpack.errors import TableError


def test_a_bar_is_named_by_its_number() -> None:
    assert str(bar(8)) == "No. 8"
    assert bar(11) is NO_11


@pytest.mark.parametrize("size", [0, 1, 2, 12, 13, 15, 17, 19, -8])
def test_other_sizes_are_refused_with_the_allowed_ones(size: int) -> None:
    with pytest.raises(TableError, match=rf"bar #{size} +one of #3, #4, .* #14, #18 \(ASTM A615, A706\)"):
        bar(size)


@pytest.mark.parametrize("one", BARS.values(), ids=str)
def test_nominal_area_is_that_of_a_round_bar_to_the_printed_digits(one: Bar) -> None:
    # Geometry: pi d_b^2/4, rounded to hundredths by the standard.
    assert abs(one.A_b - math.pi / 4 * one.d_b**2) <= 0.0051


@pytest.mark.parametrize("one", BARS.values(), ids=str)
def test_nominal_weight_is_that_of_steel(one: Bar) -> None:
    # Common practice: steel weighs 490 lb/ft^3, 3.4 lb/ft for each square inch.
    assert math.isclose(one.weight, 3.4 * math.pi / 4 * one.d_b**2, rel_tol=0.004)


@pytest.mark.parametrize("size", [3, 4, 5, 6, 7, 8])
def test_diameters_up_to_no_8_are_eighths_of_an_inch(size: int) -> None:
    assert bar(size).d_b == size / 8


def test_grades_of_the_bar_standards() -> None:
    # From memory: A615 grades 40, 60, 80, 100; A706 grades 60, 80, 100.
    assert standards_of_grade(40_000.0) == (ASTM_A615,)
    assert standards_of_grade(60_000.0) == (ASTM_A615, ASTM_A706)
    assert standards_of_grade(66_000.0) == ()
    assert 80_000.0 in GRADES[ASTM_A706]


def test_standards_have_a_name_and_a_title() -> None:
    assert str(ACI_318_19("25.4.2.4a")) == "ACI 318-19 25.4.2.4a"
    assert "2014" in ACI_318_14.title
