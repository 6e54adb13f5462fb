"""Trade dimensions and scales. How they are written is common practice in US drawings."""

from __future__ import annotations

import math

import pytest

from calcpack.errors import RangeError
from calcpack.figures import feet_inches
from calcpack.figures.trade import Refusal, inches, scale_note, scale_that_fits


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (0.0, '0"'),
        (0.5, '1/2"'),
        (2.5, '2 1/2"'),
        (2.0, '2"'),
        (11.9375, '11 15/16"'),
        (12.0, "1'-0\""),
        (12.5, "1'-0 1/2\""),
        (18.0, "1'-6\""),
        (150.5, "12'-6 1/2\""),
        (23.9999, "2'-0\""),
        (24.0, "2'-0\""),
        (-36.0, "-3'-0\""),
        (2.54, '2.54"'),
        (14.3, "1'-2.3\""),
    ],
)
def test_feet_and_inches(value: float, text: str) -> None:
    # Expected: each is the same length written out by hand.
    assert feet_inches(value) == text


@pytest.mark.parametrize("sixteenths", range(0, 400, 7))
def test_a_written_dimension_reads_back(sixteenths: int) -> None:
    value = sixteenths / 16
    text = feet_inches(value)
    feet, _, rest = text.rpartition("'-")
    parts = rest.removesuffix('"').split()
    read = sum(float(p.split("/")[0]) / float(p.split("/")[1]) if "/" in p else float(p) for p in parts)
    assert 12 * float(feet or 0) + read == value


def test_a_fraction_only_where_it_is_one() -> None:
    # A sixteenth is 0.0625; 0.002 in is the tolerance the function states, on either side of it.
    assert inches(0.0625 + 0.0019) == "1/16"
    assert inches(0.0625 + 0.0021) == "0.06"
    assert inches(3.75) == "3 3/4"


@pytest.mark.parametrize(
    ("scale", "text"),
    [
        (8.0, "Scale 1 in = 8 in"),
        (47.0, "Scale 1 in = 47 in"),
        (48.0, "Scale 1 in = 4 ft"),
        (240.0, "Scale 1 in = 20 ft"),
    ],
)
def test_the_scale_in_words(scale: float, text: str) -> None:
    assert scale_note(scale) == text


def test_the_largest_trade_scale_that_fits() -> None:
    # 18 in on 2.4 in of paper needs 7.5 in an inch: 1 in = 8 in is the next trade scale.
    assert scale_that_fits(18.0, 10.0, 2.4, 2.4) == 8
    # The higher side governs: 24 in / 2.4 in = 10.
    assert scale_that_fits(18.0, 24.0, 2.4, 2.4) == 12
    assert scale_that_fits(9.6, 1.0, 2.4, 2.4) == 4
    assert scale_that_fits(9.61, 1.0, 2.4, 2.4) == 8
    # Beyond 1 in = 50 ft in steps of 10 ft: 2500 ft on 4 in are 625 ft in an inch.
    assert scale_that_fits(30000.0, 1.0, 4.0, 4.0) == 7560


def test_a_refusal_says_everything_at_once() -> None:
    refusal = Refusal("the figure")
    refusal.positive(b=0.0, h=-1.0, cover=math.nan, d=1.0)
    refusal.unless(False, "n = 1", "2 or more", "add a bar")
    refusal.unless(True, "never", "said")
    with pytest.raises(RangeError, match="the figure cannot be drawn") as caught:
        refusal.settle()
    assert [problem.given for problem in caught.value.problems] == ["b = 0 in", "h = -1 in", "cover = nan in", "n = 1"]
    assert "2 or more: add a bar" in str(caught.value)


def test_no_problem_no_refusal() -> None:
    refusal = Refusal("the figure")
    refusal.positive(b=0.001)
    refusal.settle()
    assert list(refusal) == []
