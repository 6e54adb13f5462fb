"""Dowels into a foundation: area, development below, lap above."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import pytest

from calcpack.aci318.editions import Edition
from calcpack.errors import RangeError
from calcpack.members.dowels import Dowels, work_dowels
from calcpack.members.pad import FloatPad
from calcpack.members.results import CheckResult

# The column of AB-FT-05: 14 by 14 in, 4 No. 11, dowels 4 No. 8; 4,000 psi on both sides, Grade 60.
PLAIN = Dowels(
    mark="C1", A_g=196.0, n_bars=4, bar=8, column_bar=11, f_c_foundation=4_000.0, f_c_column=4_000.0, f_y=60_000.0,
    into_foundation=20.0, into_column=30.0, source="S-301, detail 2, rev 1",
)  # fmt: skip


def shown(result: CheckResult, symbol: str) -> tuple[str, str]:
    """A value with three decimals, and its unit."""
    value, unit = result.values[symbol]
    return f"{value:.3f}", unit


def test_dowels_of_a_column(each: Edition, steps: Any) -> None:
    area, below, above = work_dowels(steps, PLAIN, each)
    # published, AB-FT-05: 0.005*196 = 0.98 in^2 against 4*0.79 = 3.16 in^2.
    assert shown(area, "A_s_min") == ("0.980", "in^2")
    assert shown(area, "A_s") == ("3.160", "in^2")
    assert (area.clause, area.verdict) == ("16.3.4.1", "OK")
    assert area.ratio == pytest.approx(0.98 / 3.16)
    # common practice, 25.4.9.2: 60000/(50 sqrt(4000)) = 18.974 in for No. 8, 26.753 in for No. 11.
    assert shown(below, "l_dc") == ("18.974", "in")
    assert below.verdict == "OK"
    # 25.5.5.4: No. 11 developed, or No. 8 lapped 30 in.
    assert shown(above, "l_sc") == ("30.000", "in")
    assert (above.clause, above.verdict) == ("25.5.5.4", "OK")
    assert steps.told("heading") == ["C1: area of dowels", "C1: dowels in the foundation", "C1: dowels in the column"]


@pytest.mark.parametrize(
    ("changes", "words"),
    [
        ({"A_g": 632.0}, ["OK", "OK", "OK"]),
        ({"A_g": 633.0}, ["NG", "OK", "OK"]),
        ({"into_foundation": 18.9}, ["OK", "NG", "OK"]),
        ({"into_column": 29.9}, ["OK", "OK", "NG"]),
        # The larger bar of the column in 26.75 in, the dowels in ties in 24.9 in.
        ({"into_column": 26.8, "ties": True}, ["OK", "OK", "OK"]),
        ({"into_column": 26.7, "ties": True}, ["OK", "OK", "NG"]),
        # Inside a spiral both are shorter: 22.5 in, and 20.06 in for the No. 11.
        ({"into_column": 22.5, "spiral": True}, ["OK", "OK", "OK"]),
        ({"column_bar": 8}, ["OK", "OK", "OK"]),
        # 25.5.5.3: No. 14 bars lap with smaller dowels in compression, 60000/(50 sqrt(4000))*1.693 = 32.12 in.
        ({"column_bar": 14}, ["OK", "OK", "NG"]),
        ({"column_bar": 14, "into_column": 32.2}, ["OK", "OK", "OK"]),
    ],
)
def test_both_sides_of_each_condition(changes: dict[str, Any], words: list[str], each: Edition) -> None:
    assert [one.verdict for one in work_dowels(FloatPad(), replace(PLAIN, **changes), each)] == words


@pytest.mark.parametrize(
    ("changes", "message"),
    [
        ({"bar": 14}, r"bar = #14 +#3 to #11, lapped with the column's bars \(16.3.5.4, 25.5.1.1\)"),
        ({"bar": 12}, r"bar = #12 +#3 to #11"),
        ({"n_bars": 0}, r"n_bars = 0 +one dowel or more"),
        ({"A_g": 0.0}, r"A_g = 0 in\^2 +above zero \(16.3.4.1\)"),
        ({"into_foundation": 0.0}, r"available = 0 in +a length above zero"),
    ],
)
def test_dowels_that_cannot_be(changes: dict[str, Any], message: str, each: Edition) -> None:
    with pytest.raises(RangeError, match=message):
        work_dowels(FloatPad(), replace(PLAIN, **changes), each)
