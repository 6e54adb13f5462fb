"""What a row of the column schedule is refused for: both sides of each limit, and the value on it."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import pytest

from calcpack.aci318.editions import Edition, edition
from calcpack.errors import RangeError
from calcpack.members.column import Context, check
from calcpack.members.column_section import Bars, Column, Force, Ties

TIED = Column("C1", 16.0, 16.0, Bars(8, 9, 3, 3), Ties("ties", 3, 12.0), 1.5, 4_000.0, 60_000.0)
ROUND = Column("C2", None, 20.0, Bars(8, 8), Ties("spiral", 4, 2.5), 1.5, 5_000.0, 60_000.0)
FORCES = [Force("1.4D", 100_000.0)]


def accepted(column: Column, one: Edition) -> bool:
    try:
        check(column, FORCES, Context(one))
    except RangeError:
        return False
    return True


@pytest.mark.parametrize(
    ("changes", "fine"),
    [
        ({"f_c": 2_499.0}, False),
        ({"f_c": 2_500.0}, True),
        ({"f_c": 2_501.0}, True),
        ({"f_c": 20_000.0}, True),
        ({"f_c": 20_001.0}, False),
        ({"f_y": 39_999.0}, False),
        ({"f_y": 40_000.0}, True),
        ({"cover": 0.0}, False),
        ({"cover": 0.75}, True),
        ({"aggregate": 0.0}, False),
        ({"aggregate": 0.75}, True),
        ({"l_u": 0.0}, False),
        ({"l_u": 120.0}, True),
        ({"h": float("inf")}, False),
        ({"h": float("nan")}, False),
        ({"ties": Ties("ties", 3, 0.375)}, False),
        ({"ties": Ties("ties", 3, 0.376)}, True),
        ({"ties": Ties("ties", 3, 0.0)}, False),
        ({"bars": Bars(4, 9, 2, 2)}, True),
        ({"bars": Bars(4, 9, 1, 3)}, False),
        ({"bars": Bars(7, 9, 3, 3)}, False),
        ({"bars": Bars(9, 9, 3, 3)}, False),
        ({"bars": Bars(10, 9, 3, 4)}, True),
        # Hand: 2 * (1.5 + 0.375 + 1.128) = 6.006 in are taken.
        ({"b": 6.006, "bars": Bars(4, 9, 2, 2)}, False),
        ({"b": 6.007, "bars": Bars(4, 9, 2, 2)}, True),
        ({"b": 30.0, "h": 6.0}, False),
    ],
)
def test_limits_of_a_rectangular_column(changes: dict[str, Any], fine: bool, each: Edition) -> None:
    assert accepted(replace(TIED, **changes), each) is fine


@pytest.mark.parametrize(
    ("changes", "fine"),
    [
        ({"bars": Bars(2, 8)}, False),
        ({"bars": Bars(3, 8)}, True),
        ({"f_yt": 39_999.0}, False),
        ({"f_yt": 40_000.0}, True),
        ({"f_yt": 100_000.0}, True),
        ({"f_yt": 100_001.0}, False),
        ({"ties": Ties("spiral", 4, 0.5)}, False),
        ({"ties": Ties("spiral", 4, 0.51)}, True),
        # Hand: 2 * (1.5 + 0.5 + 1) = 6 in are taken.
        ({"h": 6.0}, False),
        # Three bars of 1 in touch on a circle of 1/sin(60 deg) = 1.1547 in: 5 + 1.1547 in.
        ({"h": 6.154, "bars": Bars(3, 8)}, False),
        ({"h": 6.155, "bars": Bars(3, 8)}, True),
    ],
)
def test_limits_of_a_circular_column(changes: dict[str, Any], fine: bool, each: Edition) -> None:
    assert accepted(replace(ROUND, **changes), each) is fine


@pytest.mark.parametrize(
    ("name", "f_y", "fine"),
    [
        ("ACI 318-14", 80_000.0, True),
        ("ACI 318-14", 80_001.0, False),
        ("ACI 318-19", 80_001.0, True),
        ("ACI 318-19", 100_000.0, True),
        ("ACI 318-19", 100_001.0, False),
    ],
)
def test_largest_yield_strength_by_edition(name: str, f_y: float, fine: bool) -> None:
    # Table 20.2.2.4a, from memory: 80 ksi in 318-14, 100 ksi in 318-19.
    assert accepted(replace(TIED, f_y=f_y), edition(name)) is fine


def test_what_is_wrong_in_kind_is_told_before_what_does_not_fit(each: Edition) -> None:
    small = replace(TIED, b=5.0, ties=Ties("ties", 3, 0.3))
    with pytest.raises(RangeError) as caught:
        check(small, FORCES, Context(each))
    assert len(caught.value.problems) == 2
    with pytest.raises(RangeError) as caught:
        check(replace(small, bars=Bars(8, 12, 3, 3), cover=-1.0), FORCES, Context(each))
    assert [problem.given for problem in caught.value.problems] == ["cover = -1 in", "bars: #12"]


@pytest.mark.parametrize(
    ("size", "name"), [(2, "bars"), (12, "bars"), (18, None), (3, None)], ids=["#2", "#12", "#18", "#3"]
)
def test_sizes_that_are_not_made(size: int, name: str | None, each: Edition) -> None:
    column = replace(TIED, b=30.0, h=30.0, bars=Bars(8, size, 3, 3))
    if name is None:
        assert check(column, FORCES, Context(each))
    else:
        with pytest.raises(RangeError, match=rf"{name}: #{size} +one of #3, #4, .*#18 \(ASTM A615, A706\)"):
            check(column, FORCES, Context(each))


def test_strength_beyond_what_the_stress_block_is_used_for() -> None:
    with pytest.raises(RangeError, match=r"f_c = 20,001 psi +allowed up to 20,000 psi"):
        check(replace(TIED, f_c=20_001.0), FORCES, Context(edition("ACI 318-19")))


@pytest.mark.parametrize(
    ("column", "given"),
    [
        # Hand: (12 - 3.75 - 1.41)/6 = 1.14 in; 7 sin(pi/24) = 0.9137 in between bars of 1 in.
        (replace(TIED, b=12.0, bars=Bars(24, 11, 7, 7)), r"24-#11, which overlap along x +1\.41 in .*, not 1\.14 in"),
        (replace(TIED, h=12.0, bars=Bars(24, 11, 7, 7)), r"24-#11, which overlap along y +1\.41 in .*, not 1\.14 in"),
        (replace(ROUND, h=12.0, bars=Bars(24, 8)), r"24-#8, which overlap on the circle +1 in .*, not 0\.9137 in"),
    ],
)
def test_bars_that_overlap_are_refused(column: Column, given: str) -> None:
    with pytest.raises(RangeError, match=given):
        check(column, FORCES, Context(edition("ACI 318-19")))
